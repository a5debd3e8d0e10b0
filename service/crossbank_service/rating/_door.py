"""The door: a request is checked against physics and geometry and becomes plain numbers, once."""

from dataclasses import replace

import numpy as np

from crossbank.contract import (
    Assumed,
    Bank,
    Condensing,
    HeldSurface,
    Plate,
    Pure,
    RateRequest,
    SinglePhase,
    broken_rules,
    given,
)
from crossbank.contract.names import fluid_slug
from crossbank_service import properties
from crossbank_service.errors import CoreError
from crossbank_service.properties.moist_air import MASS_RATIO
from crossbank_service.rating import _fluid_door
from crossbank_service.rating._case import Case, FluidInput, InsideInput, SectionInput
from crossbank_service.rating._circuit import Circuit
from crossbank_service.rating._composition import composition_of
from crossbank_service.rating._engine import bank_of
from crossbank_service.rating._faults import Faults
from crossbank_service.rating._flow_door import mass_flow, outside_pressure
from crossbank_service.rating._gas_door import gas_assumptions
from crossbank_service.rating._methods import choose_inside, choose_outside
from crossbank_service.rating._surface_door import bond, sections_of

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
    sections = sections_of(request.bank, faults)
    circuit = _circuit(request.bank, faults)
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
    pressure = outside_pressure(request.outside, faults)
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
    if detail.resolution == "bank" and len(sections) > 1:
        faults.reject(
            "/detail/resolution",
            "Row groups have coefficients of their own; they are rated with resolution 'row'.",
            "bank",
            one_of=("row",),
        )
    if not _has_free_section(request, sections, faults):
        return faults.error()
    face_area = float(bank_of(sections[:1]).face_area[0])
    flow = mass_flow(request.outside, fluid, pressure, face_area, faults)
    found = composition_of(fluid)
    methods = choose_inside(request, inside.kind, faults)
    sections = choose_outside(request, sections, gas=fluid.gas, faults=faults)
    if faults:
        return faults.error()
    case = Case(
        request=request,
        sections=sections,
        outside_fluid=fluid,
        outside_flow=flow,
        outside_temperature=request.outside.inlet_temperature_k,
        outside_pressure=pressure,
        outside_fouling=given(request.outside.fouling_m2_k_w),
        humidity_ratio=found.humidity_ratio if found else None,
        molar_ratio=found.molar_ratio if found else MASS_RATIO,
        water_mole_fraction=found.water if found else None,
        sulfur_dioxide_mole_fraction=found.sulfur_dioxide if found else None,
        inside=inside,
        circuit=circuit,
        segments=_segments(request, inside, circuit),
        property_state=property_state,
        methods=methods,
        assumed=_assumed(request, inside, pressure, sections) + gas_assumptions(request, found),
    )
    return replace(case, idle=_idle(case))


def _has_free_section(request: RateRequest, sections: tuple[SectionInput, ...], faults: Faults) -> bool:
    for section in sections:
        free = float(bank_of([section]).free_area[0])
        if free <= 0.0:
            faults.refuse(
                "/bank/layout/side_gap_m",
                "No free section is left: the side gaps take away more than the gaps between the tubes give.",
                request.bank.layout.side_gap_m,
                "m",
                at_least=section.bank["side_gap"] - 0.5 * free / section.bank["tube_length"],
            )
            return False
    return True


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


def _assumed(
    request: RateRequest, inside: InsideInput, pressure: float, sections: tuple[SectionInput, ...]
) -> tuple[Assumed, ...]:
    layout, tube, outside = request.bank.layout, request.bank.tube, request.outside
    out = []
    if layout.side_gap_m is None:
        what = "fin tips" if sections[0].kind != "plain" else "tubes"
        out.append(
            Assumed(
                pointer="/bank/layout/side_gap_m",
                value=sections[0].bank["side_gap"],
                unit="m",
                why=f"half the clear gap between {what}",
            )
        )
    fins = request.bank.fins
    if fins is not None and fins.bond_resistance_m2_k_w is None:
        attachment = None if isinstance(fins, Plate) else fins.attachment
        out.append(
            Assumed(
                pointer="/bank/fins/bond_resistance_m2_k_w",
                value=bond(fins),
                unit="m2 K/W",
                why=f"typical of {attachment} fins" if attachment else "fins in full contact with the tube",
            )
        )
    if outside.inlet_pressure_pa is None:
        out.append(
            Assumed(
                pointer="/outside/inlet_pressure_pa",
                value=pressure,
                unit="Pa",
                why="standard atmosphere at the elevation given"
                if outside.inlet_gauge_pressure_pa is None
                else "standard atmosphere at the elevation given, and the gauge pressure on top",
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
