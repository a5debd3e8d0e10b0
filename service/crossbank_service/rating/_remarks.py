"""Notices of a rated case: what its reader should know beside the numbers."""

import numpy as np

from crossbank.contract import Notice
from crossbank_service import properties
from crossbank_service.rating._case import Case, FluidInput
from crossbank_service.rating._composition import gas_limits
from crossbank_service.rating._gas_remarks import gas_remarks, inside_gas_remarks
from crossbank_service.rating._performance import InsideFound, OutsideFound, Performance, WetFound
from crossbank_service.rating._ranges import MethodRange
from crossbank_service.rating._report import one
from crossbank_service.rating._surface_door import half_gap
from crossbank_service.rating._uneven import Unevenness
from crossbank_service.rating.notices import notice

VAPOUR_PRESSURE_SHARE = 0.1


def remarks(
    case: Case, found: Performance, used: tuple[MethodRange, ...], unevenness: Unevenness | None
) -> list[Notice]:
    """All notices of a case."""
    out = []
    if unevenness is not None and not case.idle:
        out.append(_uneven_remark(unevenness))
    if case.idle:
        out.append(notice(case.idle, pointer=_idle_pointer(case)))
    out += _fluid_remarks(case, found)
    out += _layout_remarks(case)
    if case.outside_flow:
        out += [
            notice("method-out-of-range", each.note, f"/methods/{each.method.role}")
            for each in used
            if not each.within and not case.idle
        ]
        out += [
            notice("method-doubt", f"{each.method.slug}: {each.method.doubt}", f"/methods/{each.method.role}")
            for each in used
            if each.method.doubt
        ]
    out.append(notice("estimate"))
    return out


def _idle_pointer(case: Case) -> str | None:
    if case.idle == "no-flow":
        return "/outside/flow" if case.outside_flow == 0.0 else "/inside/flow_kg_s"
    return "/outside/inlet_temperature_k"


def _uneven_remark(found: Unevenness) -> Notice:
    passing = f"{found.bypass:.1%} of the stream passes the tubes unheated; " if found.bypass > 0.0 else ""
    return notice(
        "uneven-stream",
        f"{passing}against an even stream through the whole bank the duty is {found.loss:.2%} less, and the streams "
        f"behind the bank differ by {found.spread:.1f} K before they mix.",
        "/outside/distribution" if found.bypass == 0.0 else "/outside",
    )


def _layout_remarks(case: Case) -> list[Notice]:
    if case.bank["side_gap"] > 1.05 * half_gap(case.sections[0]):
        return [notice("side-gap-bypass", pointer="/bank/layout/side_gap_m")]
    return []


def _fluid_remarks(case: Case, found: Performance) -> list[Notice]:
    if case.idle and case.idle != "no-difference":
        return []
    out: list[Notice] = []
    o, i = found.outside, found.inside
    out += gas_remarks(case, found)
    if found.wet is not None:
        out += _wet_remarks(found.wet)
    out += _phase_remarks(case.outside_fluid, o, one(o.outlet_pressure), "outside", "/outside/fluid")
    fluid = case.inside.fluid
    if i is not None and fluid is not None and case.inside.kind == "single-phase":
        out += _phase_remarks(fluid, i, one(i.outlet_pressure), "inside", "/inside/fluid")
        out += inside_gas_remarks(fluid, i)
    if (
        i is not None
        and case.inside.kind == "condensing"
        and one(i.drop) > VAPOUR_PRESSURE_SHARE * case.inside.pressure
    ):
        out.append(
            notice(
                "vapour-pressure-exhausted",
                f"The vapour loses {one(i.drop):.4g} Pa of {case.inside.pressure:.4g} Pa on its way through the tubes.",
                "/inside/inlet_pressure_pa",
            )
        )
    return out


def _wet_remarks(wet: WetFound) -> list[Notice]:
    out = []
    if one(wet.removed) > 0.0:
        out.append(notice("wet-surface", pointer="/outside/fluid"))
    if one(wet.fog) > 0.0:
        out.append(
            notice(
                "fog",
                f"{one(wet.fog):.4g} kg/s of vapour turns to fog in the stream and is carried on with it.",
                "/outside/fluid",
            )
        )
    if one(wet.frost) > 0.0:
        out.append(notice("frost", pointer="/outside/fluid"))
    return out


def _phase_remarks(
    fluid: FluidInput, found: OutsideFound | InsideFound, pressure: float, side: str, pointer: str
) -> list[Notice]:
    lowest = min(one(found.face_min), one(found.bulk_min))
    highest = max(one(found.face_max), one(found.bulk_max))
    out: list[Notice] = []
    match fluid.family[0]:
        case "pure":
            out += _saturation_remarks(fluid, lowest, highest, pressure, side, pointer)
            low, high = _pure_range(fluid)
            if fluid.gas is False and lowest <= low:
                out.append(_freezing(lowest, low, fluid.family[1], pointer))
            elif not low <= lowest <= highest <= high:
                out.append(_beyond(lowest, highest, low, high, pointer))
        case "solution":
            name, x = fluid.family[1], float(fluid.numbers[0])  # type: ignore[arg-type]
            freezing = float(properties.freezing_temperature(name, np.array([x]))[0])
            highest_known = properties.solution_limits(name).highest_temperature_k
            if lowest <= freezing:
                out.append(_freezing(lowest, freezing, name, pointer))
            if highest > highest_known:
                out.append(_beyond(lowest, highest, freezing, highest_known, pointer))
        case "table":
            t = fluid.numbers[0]
            assert isinstance(t, tuple)
            if len(t) > 1 and not t[0] <= lowest <= highest <= t[-1]:
                out.append(_beyond(lowest, highest, t[0], t[-1], pointer))
        case _:
            low, high = gas_limits(fluid)
            if not low <= lowest <= highest <= high:
                out.append(_beyond(lowest, highest, low, high, pointer))
    return out


def _saturation_remarks(
    fluid: FluidInput, lowest: float, highest: float, pressure: float, side: str, pointer: str
) -> list[Notice]:
    name = fluid.family[1]
    if properties.pure_limits(name).saturation_highest_temperature_k is None:
        return []
    saturation = properties.Saturation(name)
    lowest_pressure, highest_pressure = saturation.pressure_limits_pa
    if not lowest_pressure <= pressure <= highest_pressure:
        return []
    boiling = float(saturation.temperature(np.array([pressure]))[0])
    if not fluid.gas and highest >= boiling:
        return [
            notice(
                f"{side}-boils",
                f"{name} reaches {highest:.2f} K in its bulk or at the wall and boils at {boiling:.2f} K "
                f"({highest - boiling:.2f} K above); it was computed as a liquid.",
                pointer,
            )
        ]
    if fluid.gas and lowest <= boiling:
        return [
            notice(
                "gas-condenses",
                f"{name} cools to {lowest:.2f} K in its bulk or at the wall and condenses at {boiling:.2f} K; it was "
                "computed as a gas.",
                pointer,
            )
        ]
    return []


def _pure_range(fluid: FluidInput) -> tuple[float, float]:
    """Temperatures a pure fluid is known at in its phase [K]."""
    limits = properties.pure_limits(fluid.family[1])
    top = limits.liquid_highest_temperature_k
    high = limits.gas_highest_temperature_k if fluid.gas or top is None else top
    return limits.lowest_temperature_k, high


def _freezing(lowest: float, freezing: float, name: str, pointer: str) -> Notice:
    text = f"A surface that {name} touches is at {lowest:.2f} K; it freezes at {freezing:.2f} K."
    return notice("freezing", text, pointer)


def _beyond(lowest: float, highest: float, low: float, high: float, pointer: str) -> Notice:
    text = (
        f"Temperatures from {lowest:.2f} to {highest:.2f} K occur; the fluid's properties are known from {low:.2f} to "
        f"{high:.2f} K and were held at the edge beyond."
    )
    return notice("property-out-of-range", text, pointer)
