"""Results in the words of the contract, one case at a time."""

import math

from crossbank.contract import (
    Assumed,
    GeometryResult,
    InsideResult,
    MethodUsed,
    Notice,
    OutsideResult,
    OverallResult,
    RateRequest,
    RateResult,
    Record,
    ReferenceEcho,
    ResistanceShares,
    RowResult,
    WallPlace,
    WallResult,
    bank_sha256,
    given,
    input_sha256,
)
from crossbank_service import identity
from crossbank_service.banks import TubeBank
from crossbank_service.properties import psychrometrics
from crossbank_service.rating._arrays import Array
from crossbank_service.rating._case import Case
from crossbank_service.rating._engine import bank_of
from crossbank_service.rating._performance import SHARES, Performance
from crossbank_service.rating._ranges import MethodRange


def one(values: Array) -> float:
    """The number of an array of one case."""
    return float(values[0])


def some(values: Array) -> float | None:
    """The number of an array of one case; None where it does not exist."""
    value = float(values[0])
    return value if math.isfinite(value) else None


def result(
    case: Case, found: Performance, used: tuple[MethodRange, ...], notices: list[Notice]
) -> RateResult:
    """The answer to a case from its performance (arrays of one case)."""
    request = case.request
    banks = [bank_of([section]) for section in case.sections]
    duty = 0.0 if case.idle else one(found.duty)
    # latent heat is given off by the stream
    latent = 0.0 if found.wet is None or case.idle else 0.0 - one(found.wet.latent)
    return RateResult(
        label=request.label,
        reference=ReferenceEcho.of(request.reference),
        duty_w=duty,
        sensible_duty_w=duty - latent,
        latent_duty_w=latent,
        outside=_outside(case, found),
        inside=_inside(case, found),
        overall=_overall(case, found, banks),
        geometry=_geometry(case, found, banks),
        wall=_wall(case, found),
        rows=_rows(case, found) if given(given(request.detail).rows) else [],
        methods=[_method(each) for each in used],
        assumed=_assumed(case),
        notices=notices,
        comparisons=None,
        sensitivities=None,
        assurance=None,
        solve=None,
        heat_balance_residual=0.0 if case.idle else one(found.residual),
        iterations=int(one(found.iterations)),
        record=record(request),
    )


def record(request: RateRequest) -> Record:
    """What was computed by what."""
    return Record(
        input_sha256=input_sha256("rate", request),
        bank_sha256=bank_sha256(request.bank),
        contract=identity.CONTRACT,
        service_version=identity.SERVICE_VERSION,
        numbers=identity.NUMBERS,
        properties=identity.properties_version(),
    )


def _method(used: MethodRange) -> MethodUsed:
    return MethodUsed(
        role=used.method.role,
        method=used.method.slug,
        source=used.method.source,
        in_range=used.within,
        range_note=used.note,
        scatter_fraction=used.method.scatter_fraction,
    )


def _assumed(case: Case) -> list[Assumed]:
    return list(case.assumed)


def _outside(case: Case, found: Performance) -> OutsideResult:
    o = found.outside
    still = case.outside_flow == 0.0
    friction, momentum = (0.0, 0.0) if still else (one(o.friction_drop), one(o.momentum_drop))
    outlet = case.outside_temperature if case.idle else one(o.outlet_temperature)
    pressure = case.outside_pressure if still else one(o.outlet_pressure)
    density = one(o.inlet_density)
    w = case.humidity_ratio
    removed = 0.0
    if found.wet is not None:
        w, removed = one(found.wet.outlet_humidity), one(found.wet.removed)
    return OutsideResult(
        mass_flow_kg_s=case.outside_flow,
        inlet_temperature_k=case.outside_temperature,
        outlet_temperature_k=outlet,
        inlet_density_kg_m3=density,
        outlet_density_kg_m3=density if still else one(o.outlet_density),
        outlet_pressure_pa=pressure,
        pressure_drop_pa=friction + momentum,
        friction_pressure_drop_pa=friction,
        momentum_pressure_drop_pa=momentum,
        approach_velocity_m_s=0.0 if still else one(o.approach_velocity),
        max_velocity_m_s=0.0 if still else one(o.max_velocity),
        reynolds_max=0.0 if still else one(o.reynolds),
        heat_transfer_coefficient_w_m2_k=None if case.idle else one(o.coefficient),
        fin_efficiency=one(o.fin_efficiency) if case.finned and not case.idle else None,
        surface_efficiency=None if case.idle else one(o.surface_efficiency),
        flow_power_w=case.outside_flow / density * (friction + momentum),
        outlet_humidity_ratio=w,
        outlet_relative_humidity=None
        if w is None
        else pressure * w / (w + case.molar_ratio) / float(psychrometrics.saturation_pressure(outlet)),
        moisture_removed_kg_s=None if w is None else removed,
    )


def _inside(case: Case, found: Performance) -> InsideResult:
    i, kind = found.inside, case.inside.kind
    if i is None:
        held = case.inside.temperature if kind == "held-surface" else None
        return _empty_inside(kind, held)
    vapour = kind == "condensing"
    idle = case.idle == "no-flow" or (vapour and case.idle is not None)
    return InsideResult(
        kind=kind,
        mass_flow_kg_s=one(i.flow),
        inlet_temperature_k=one(i.inlet_temperature),
        outlet_temperature_k=one(i.outlet_temperature),
        outlet_pressure_pa=one(i.outlet_pressure),
        pressure_drop_pa=one(i.drop),
        heat_transfer_coefficient_w_m2_k=None if idle else one(i.coefficient),
        inlet_velocity_m_s=one(i.inlet_velocity),
        outlet_velocity_m_s=one(i.outlet_velocity),
        mass_flux_kg_m2_s=one(i.flux),
        reynolds=one(i.reynolds),
        saturation_temperature_k=case.inside.temperature if vapour else None,
        condensate_kg_s=one(i.flow) if vapour else None,
        outlet_quality=0.0 if vapour else None,
        outlet_subcooling_k=0.0 if vapour else None,
    )


def _empty_inside(kind: str, held: float | None) -> InsideResult:
    return InsideResult(
        kind=kind,
        mass_flow_kg_s=None,
        inlet_temperature_k=held,
        outlet_temperature_k=held,
        outlet_pressure_pa=None,
        pressure_drop_pa=None,
        heat_transfer_coefficient_w_m2_k=None,
        inlet_velocity_m_s=None,
        outlet_velocity_m_s=None,
        mass_flux_kg_m2_s=None,
        reynolds=None,
        saturation_temperature_k=None,
        condensate_kg_s=None,
        outlet_quality=None,
        outlet_subcooling_k=None,
    )


def _overall(case: Case, found: Performance, banks: list[TubeBank]) -> OverallResult:
    area = sum(one(bank.outside_area) for bank in banks)
    o = found.overall
    if case.idle:
        return OverallResult(
            area_m2=area,
            coefficient_w_m2_k=None,
            coefficient_clean_w_m2_k=None,
            ua_w_k=None,
            log_mean_difference_k=None,
            mean_difference_k=None,
            crossflow_correction=None,
            effectiveness=None,
            ntu=None,
            closest_approach_k=None,
            duty_margin_fraction=None,
            excess_area_fraction=None,
            resistance_shares=None,
        )
    shares = dict(zip(SHARES, (float(share) for share in o.shares[0]), strict=True))
    return OverallResult(
        area_m2=area,
        coefficient_w_m2_k=one(o.coefficient),
        coefficient_clean_w_m2_k=one(o.coefficient_clean),
        ua_w_k=one(o.ua),
        log_mean_difference_k=some(o.log_mean),
        mean_difference_k=one(o.mean_difference),
        crossflow_correction=some(o.correction),
        effectiveness=some(o.effectiveness),
        ntu=some(o.ntu),
        closest_approach_k=one(o.closest_approach),
        duty_margin_fraction=None,
        excess_area_fraction=None,
        resistance_shares=ResistanceShares(**shares),
    )


def _geometry(case: Case, found: Performance, banks: list[TubeBank]) -> GeometryResult:
    def total(name: str) -> float:
        return sum(one(getattr(bank, name)) for bank in banks)

    masses = [one(bank.metal_mass) for bank in banks]
    metal = sum(masses) if all(masses) else None
    lanes = sum(width for width, _ in case.lanes)
    volume = total("inside_volume")
    filling = 0.0 if found.inside is None else one(found.inside.density) * volume
    return GeometryResult(
        tube_count=round(total("tube_count")),
        width_m=one(banks[0].width) + lanes,
        height_m=case.bank["tube_length"],
        depth_m=_depth(case, banks[0]),
        face_area_m2=one(banks[0].face_area) + lanes * case.bank["tube_length"],
        free_flow_area_m2=min(one(bank.free_area) for bank in banks),
        outside_area_m2=total("outside_area"),
        bare_area_m2=total("bare_area"),
        fin_area_m2=total("fin_area"),
        inside_area_m2=total("inside_area"),
        inside_volume_m3=volume,
        dry_mass_kg=metal,
        operating_mass_kg=None if metal is None else metal + filling,
    )


def _depth(case: Case, bank: TubeBank) -> float:
    """Extent along the outside stream: the bundles one by one, and the cavities between them [m]."""
    bundles, pitch = case.cavities + 1, case.bank["longitudinal_pitch"]
    if bank.fins is not None and bank.fins.kind == "plate":
        return case.circuit.rows * pitch + case.cavity_depth
    reach = bundles * one(bank.surface.envelope_diameter)
    return (case.circuit.rows - bundles) * pitch + reach + case.cavity_depth


def _wall(case: Case, found: Performance) -> WallResult:
    w = found.wall
    if case.idle:
        t = case.outside_temperature
        known = t if case.outside_flow else None
        return WallResult(
            min_temperature_k=known,
            max_temperature_k=known,
            min_at=None,
            max_at=None,
            fin_tip_max_temperature_k=None,
        )
    faces = ("outside", "inside")
    return WallResult(
        min_temperature_k=one(w.lowest),
        max_temperature_k=one(w.highest),
        min_at=WallPlace(row=int(one(w.lowest_row)), face=faces[int(one(w.lowest_inner))]),
        max_at=WallPlace(row=int(one(w.highest_row)), face=faces[int(one(w.highest_inner))]),
        fin_tip_max_temperature_k=one(w.fin_tip_highest) if case.finned else None,
    )


def _condensate(found: Performance, r: int, *, vapour: bool, idle: bool) -> float | None:
    """Condensate of a row: of the vapour inside, or of the moist stream outside where its surface is wet."""
    if vapour:
        assert found.rows is not None
        return 0.0 if idle else float(found.rows.condensate[0, r])
    return None if found.wet is None or idle else float(found.wet.row_condensate[0, r])


def _rows(case: Case, found: Performance) -> list[RowResult]:
    rows, wet = found.rows, found.wet
    if rows is None:
        return []
    still, idle, kind = case.outside_flow == 0.0, case.idle is not None, case.inside.kind
    vapour = kind == "condensing"

    def at(values: Array, r: int) -> float:
        return float(values[0, r])

    out = []
    for r, p in enumerate(case.circuit.pass_of_row):
        out.append(
            RowResult(
                row=r + 1,
                pass_=None if kind == "held-surface" else p + 1,
                heat_w=0.0 if idle else at(rows.heat, r),
                outside_inlet_temperature_k=at(rows.outside_inlet, r),
                outside_outlet_temperature_k=at(rows.outside_outlet, r),
                inside_temperature_k=None if idle or kind == "held-surface" else at(rows.inside, r),
                wall_temperature_k=None if idle else at(rows.wall, r),
                wet=None if case.humidity_ratio is None else wet is not None and bool(wet.row_wet[0, r]),
                reynolds_max=0.0 if still else at(rows.reynolds, r),
                outside_heat_transfer_coefficient_w_m2_k=None if idle else at(rows.outside_coefficient, r),
                inside_heat_transfer_coefficient_w_m2_k=None
                if idle or kind == "held-surface"
                else at(rows.inside_coefficient, r),
                pressure_drop_pa=0.0 if still else at(rows.drop, r),
                condensate_kg_s=_condensate(found, r, vapour=vapour, idle=idle),
                outlet_quality=0.0 if vapour else None,
            )
        )
    return out
