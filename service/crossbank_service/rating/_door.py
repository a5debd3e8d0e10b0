"""The door: a request is checked against physics and geometry and becomes plain numbers, once."""

import math
from dataclasses import replace

import numpy as np

from crossbank.contract import (
    ActualVolume,
    ApproachVelocity,
    Assumed,
    Bank,
    Condensing,
    HeldSurface,
    Mass,
    Material,
    Outside,
    Pure,
    RateRequest,
    ReferenceVolume,
    SinglePhase,
    broken_rules,
    given,
)
from crossbank.contract.names import fluid_slug, material_slug
from crossbank_service import properties
from crossbank_service.banks import TubeBank
from crossbank_service.errors import CoreError
from crossbank_service.properties import psychrometrics
from crossbank_service.rating import _fluid_door
from crossbank_service.rating._case import Case, Curve, FluidInput, InsideInput
from crossbank_service.rating._circuit import Circuit
from crossbank_service.rating._faults import Faults
from crossbank_service.rating._fluids import medium_of
from crossbank_service.rating._methods import choose

PASS_LOSS_HEADS = 1.5  # entry 0.5 and exit 1.0 velocity heads, headers between passes alike
VAPOUR_ENTRY_HEADS = 0.5
SEGMENTS_ONE_PASS = 24
SEGMENTS_MORE_PASSES = 12
SEGMENTS_CONDENSING = 8


def enter(request: RateRequest) -> Case | CoreError:
    """Check a request; what is wrong comes back as one error that names every member."""
    faults = Faults()
    for broken in broken_rules(request):
        faults.reject(broken.pointer, broken.detail, broken.given)
    if faults:
        return faults.error()
    _geometry(request.bank, faults)
    circuit = _circuit(request.bank, faults)
    conductivity, density = _material(request.bank, faults)
    detail = given(request.detail)
    property_state = given(detail.property_state)
    if detail.resolution == "row" and property_state != "local":
        faults.reject(
            "/detail/property_state",
            f"'{property_state}' goes with resolution 'bank'; 'row' takes local properties.",
            property_state,
            one_of=("local",),
        )
    if detail.resolution == "bank" and property_state == "local":
        property_state = "mean"
    pressure = _outside_pressure(request.outside)
    fluid = _fluid_door.check_fluid(
        request.outside.fluid,
        request.outside.inlet_temperature_k,
        pressure,
        "/outside",
        faults,
    )
    inside = _inside(request, faults)
    if circuit and inside and inside.kind == "condensing" and circuit.passes > 1:
        faults.reject(
            "/bank/circuit/passes",
            "Vapour that condenses inside is computed in one pass: every row takes its own share.",
            circuit.passes,
        )
    if faults or fluid is None or inside is None or circuit is None:
        return faults.error()
    bank = _numbers(request.bank, density)
    if _free_area(bank) <= 0.0:
        faults.refuse(
            "/bank/layout/side_gap_m",
            "No free section is left: the side gaps take away more than the gaps between the tubes give.",
            request.bank.layout.side_gap_m,
            "m",
            at_least=_needed_gap(bank),
        )
        return faults.error()
    flow = _mass_flow(request.outside, fluid, pressure, bank, faults)
    methods = choose(request, bank["staggered"] > 0.5, fluid.gas, inside.kind, faults)
    if faults or methods is None:
        return faults.error()
    case = Case(
        request=request,
        bank=bank,
        conductivity=conductivity,
        outside_fluid=fluid,
        outside_flow=flow,
        outside_temperature=request.outside.inlet_temperature_k,
        outside_pressure=pressure,
        outside_fouling=given(request.outside.fouling_m2_k_w),
        humidity_ratio=float(fluid.numbers[0]) if fluid.family == ("moist-air",) else None,  # type: ignore[arg-type]
        inside=inside,
        circuit=circuit,
        segments=_segments(request, inside, circuit),
        property_state=property_state,
        methods=methods,
        assumed=_assumed(request, inside, pressure),
    )
    return replace(case, idle=_idle(case))


def _geometry(bank: Bank, faults: Faults) -> None:
    layout, tube = bank.layout, bank.tube
    d, st, sl = tube.outer_diameter_m, layout.transverse_pitch_m, layout.longitudinal_pitch_m
    if tube.wall_thickness_m >= 0.5 * d:
        faults.refuse(
            "/bank/tube/wall_thickness_m",
            "The wall is as thick as the tube's radius or thicker: no bore is left.",
            tube.wall_thickness_m,
            "m",
            at_most=0.5 * d,
        )
    if st <= d:
        faults.refuse(
            "/bank/layout/transverse_pitch_m",
            "Tubes side by side touch or overlap: the transverse pitch must exceed the outer diameter.",
            st,
            "m",
            at_least=d,
        )
    if layout.rows == 1:
        return
    if layout.arrangement == "inline":
        if sl <= d:
            faults.refuse(
                "/bank/layout/longitudinal_pitch_m",
                "Tubes behind each other touch or overlap: the longitudinal pitch must exceed the outer diameter.",
                sl,
                "m",
                at_least=d,
            )
        return
    if math.hypot(0.5 * st, sl) <= d:
        least = math.sqrt(max(d * d - 0.25 * st * st, 0.0))
        faults.refuse(
            "/bank/layout/longitudinal_pitch_m",
            "Tubes of neighbouring rows touch or overlap: the diagonal pitch "
            f"{math.hypot(0.5 * st, sl):.6g} m must exceed the outer diameter {d:g} m.",
            sl,
            "m",
            at_least=least,
        )
    elif layout.rows > 2 and 2.0 * sl <= d:
        faults.refuse(
            "/bank/layout/longitudinal_pitch_m",
            "Tubes two rows apart stand behind each other and touch: twice the longitudinal pitch must exceed "
            "the outer diameter.",
            sl,
            "m",
            at_least=0.5 * d,
        )


def _circuit(bank: Bank, faults: Faults) -> Circuit | None:
    circuit = given(bank.circuit)
    rows, passes = bank.layout.rows, given(circuit.passes)
    if rows % passes:
        fitting = [str(n) for n in range(1, rows + 1) if rows % n == 0]
        faults.refuse(
            "/bank/circuit/passes",
            f"{rows} rows do not divide evenly into {passes} passes; {', '.join(fitting)} would.",
            passes,
            "1",
        )
        return None
    return Circuit((rows // passes,) * passes, against=circuit.direction == "against")


def _material(bank: Bank, faults: Faults) -> tuple[Curve, float]:
    material = bank.tube.material
    if isinstance(material, Material):
        k = material.conductivity_w_m_k
        curve: Curve = ((300.0,), (k,)) if isinstance(k, float) else (tuple(k.temperature_k), tuple(k.value))
        return curve, material.density_kg_m3 or 0.0
    records = {record.slug: record for record in properties.material_records()}
    record = records.get(material_slug(material))
    if record is None:
        faults.reject(
            "/bank/tube/material",
            f"'{material}' is not a material of this service; /v1/materials lists them, or give your own.",
            material,
            one_of=tuple(records),
        )
        return ((300.0,), (1.0,)), 0.0
    return record.conductivity_w_m_k, record.density_kg_m3


def _numbers(bank: Bank, density: float) -> dict[str, float]:
    layout, tube = bank.layout, bank.tube
    half_gap = 0.5 * (layout.transverse_pitch_m - tube.outer_diameter_m)
    return {
        "staggered": 1.0 if layout.arrangement == "staggered" else 0.0,
        "transverse_pitch": layout.transverse_pitch_m,
        "longitudinal_pitch": layout.longitudinal_pitch_m,
        "rows": float(layout.rows),
        "tubes_per_row": float(layout.tubes_per_row),
        "tube_length": layout.tube_length_m,
        "side_gap": half_gap if layout.side_gap_m is None else layout.side_gap_m,
        "outer_diameter": tube.outer_diameter_m,
        "wall_thickness": tube.wall_thickness_m,
        "roughness": given(tube.roughness_m),
        "tube_density": density,
    }


def _free_area(bank: dict[str, float]) -> float:
    return float(TubeBank(**{name: np.array([value]) for name, value in bank.items()}).free_area[0])


def _needed_gap(bank: dict[str, float]) -> float:
    """The side gap at which the free section vanishes [m]."""
    return bank["side_gap"] - 0.5 * _free_area(bank) / bank["tube_length"]


def _outside_pressure(outside: Outside) -> float:
    if outside.inlet_pressure_pa is not None:
        return outside.inlet_pressure_pa
    return float(psychrometrics.standard_pressure(given(outside.elevation_m)))


def _mass_flow(
    outside: Outside, fluid: FluidInput, pressure: float, bank: dict[str, float], faults: Faults
) -> float:
    flow = outside.flow
    if isinstance(flow, Mass):
        return flow.kg_s
    temperature = outside.inlet_temperature_k
    if isinstance(flow, ReferenceVolume):
        temperature, pressure = flow.reference_temperature_k, flow.reference_pressure_pa
        checked = _fluid_door.reference_state(fluid, temperature, pressure)
        if checked is not None:
            faults.refuse("/outside/flow/reference_temperature_k", checked, temperature, "K")
            return 0.0
    state = medium_of([fluid]).at(np.array([temperature]), np.array([pressure]))
    density = float(state.density_kg_m3[0])
    match flow:
        case ActualVolume() | ReferenceVolume():
            return flow.m3_s * density
        case ApproachVelocity():
            width = (
                (bank["tubes_per_row"] - 1.0) * bank["transverse_pitch"]
                + bank["outer_diameter"]
                + 2.0 * bank["side_gap"]
            )
            return flow.m_s * width * bank["tube_length"] * density


def _inside(request: RateRequest, faults: Faults) -> InsideInput | None:
    loss = given(request.bank.circuit).loss_coefficient
    match request.inside:
        case HeldSurface() as held:
            return InsideInput("held-surface", temperature=held.temperature_k)
        case SinglePhase() as stream:
            fluid = _fluid_door.check_fluid(
                stream.fluid,
                stream.inlet_temperature_k,
                stream.inlet_pressure_pa,
                "/inside",
                faults,
            )
            if fluid is None:
                return None
            return InsideInput(
                "single-phase",
                fluid=fluid,
                temperature=stream.inlet_temperature_k,
                pressure=stream.inlet_pressure_pa,
                flow=stream.flow_kg_s,
                fouling=given(stream.fouling_m2_k_w),
                loss_heads=PASS_LOSS_HEADS if loss is None else loss,
            )
        case Condensing() as stream:
            return _condensing(stream, VAPOUR_ENTRY_HEADS if loss is None else loss, faults)


def _condensing(stream: Condensing, loss: float, faults: Faults) -> InsideInput | None:
    name = fluid_slug(stream.fluid.name if isinstance(stream.fluid, Pure) else stream.fluid)
    pointer = "/inside/fluid/name" if isinstance(stream.fluid, Pure) else "/inside/fluid"
    if name not in _fluid_door.names("pure", condensing=True):
        _fluid_door.unknown(name, "pure", pointer, faults, condensing=True)
        return None
    saturation = properties.Saturation(name)
    (p_low, p_high), (t_low, t_high) = saturation.pressure_limits_pa, saturation.temperature_limits_k
    if stream.inlet_pressure_pa is not None:
        pressure = stream.inlet_pressure_pa
        if not p_low <= pressure <= p_high:
            faults.refuse(
                "/inside/inlet_pressure_pa",
                f"{name} is rated condensing between {p_low:.4g} and {p_high:.4g} Pa; its critical pressure is "
                f"{saturation.critical_pressure_pa:.5g} Pa.",
                pressure,
                "Pa",
                at_least=p_low,
                at_most=p_high,
            )
            return None
        temperature = float(saturation.temperature(np.array([pressure]))[0])
    else:
        temperature = given(stream.saturation_temperature_k)
        if not t_low <= temperature <= t_high:
            critical = properties.pure_limits(name).critical_temperature_k
            faults.refuse(
                "/inside/saturation_temperature_k",
                f"{name} is rated condensing between {t_low:.2f} and {t_high:.2f} K; its critical temperature is "
                f"{critical:.2f} K.",
                temperature,
                "K",
                at_least=t_low,
                at_most=t_high,
            )
            return None
        pressure = float(saturation.pressure(np.array([temperature]))[0])
    superheat = stream.inlet_superheat_k or 0.0
    if superheat > 0.0:
        phase = properties.phase_at(name, temperature + superheat, pressure)
        if phase != "gas":
            said, _, at_most, _ = _fluid_door.why_not(name, phase, pressure)
            faults.refuse(
                "/inside/inlet_superheat_k",
                f"Superheated to {temperature + superheat:.2f} K: {said}",
                superheat,
                "K",
                at_most=None if at_most is None else max(at_most - temperature, 0.0),
            )
            return None
    return InsideInput(
        "condensing",
        fluid=FluidInput(("saturation", name), ()),
        temperature=temperature,
        pressure=pressure,
        superheat=superheat,
        fouling=given(stream.fouling_m2_k_w),
        loss_heads=loss,
    )


def _segments(request: RateRequest, inside: InsideInput, circuit: Circuit) -> int:
    chosen = given(request.detail).segments
    if given(request.detail).resolution == "bank":
        return 1
    if chosen is not None:
        return chosen
    match inside.kind:
        case "held-surface":
            return 1
        case "condensing":
            return SEGMENTS_CONDENSING
        case "single-phase":
            return SEGMENTS_ONE_PASS if circuit.passes == 1 else SEGMENTS_MORE_PASSES


def _idle(case: Case) -> str | None:
    inside = case.inside
    if case.outside_flow == 0.0 or (inside.kind == "single-phase" and inside.flow == 0.0):
        return "no-flow"
    if inside.temperature == case.outside_temperature:
        return "no-difference"
    if inside.kind == "condensing" and case.outside_temperature > inside.temperature:
        return "reverse-heat-flow"
    return None


def _assumed(request: RateRequest, inside: InsideInput, pressure: float) -> tuple[Assumed, ...]:
    layout, tube, outside = request.bank.layout, request.bank.tube, request.outside
    out = []
    if layout.side_gap_m is None:
        gap = 0.5 * (layout.transverse_pitch_m - tube.outer_diameter_m)
        out.append(
            Assumed(
                pointer="/bank/layout/side_gap_m", value=gap, unit="m", why="half the clear gap between tubes"
            )
        )
    if outside.inlet_pressure_pa is None:
        out.append(
            Assumed(
                pointer="/outside/inlet_pressure_pa",
                value=pressure,
                unit="Pa",
                why="standard atmosphere at the elevation given",
            )
        )
    if outside.fouling_m2_k_w == 0.0:
        out.append(
            Assumed(pointer="/outside/fouling_m2_k_w", value=0.0, unit="m2 K/W", why="a clean surface")
        )
    if inside.kind == "held-surface":
        return tuple(out)
    if inside.fouling == 0.0:
        out.append(Assumed(pointer="/inside/fouling_m2_k_w", value=0.0, unit="m2 K/W", why="a clean bore"))
    if given(request.bank.circuit).loss_coefficient is None:
        why = (
            "entry 0.5 and exit 1.0 velocity heads a pass"
            if inside.kind == "single-phase"
            else "entry loss in velocity heads of the inlet vapour"
        )
        out.append(
            Assumed(pointer="/bank/circuit/loss_coefficient", value=inside.loss_heads, unit="1", why=why)
        )
    if inside.kind == "single-phase":
        out.append(
            Assumed(
                pointer="/bank/tube/roughness_m",
                value=given(tube.roughness_m),
                unit="m",
                why="roughness of the bore behind the inside pressure drop",
            )
        )
    if isinstance(request.inside, Condensing) and request.inside.inlet_superheat_k is None:
        out.append(
            Assumed(
                pointer="/inside/inlet_superheat_k", value=0.0, unit="K", why="dry saturated at the inlet"
            )
        )
    return tuple(out)
