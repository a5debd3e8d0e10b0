"""Fluids at the door: names, limits, phases and humidity, as plain numbers for the engine."""

import numpy as np

from crossbank.contract import CombustionGas, Fluid, GasMixture, MoistAir, Pure, Solution, Table, given
from crossbank.contract.names import fluid_slug
from crossbank_service import properties
from crossbank_service.properties import psychrometrics
from crossbank_service.properties.moist_air import TEMPERATURE_LIMITS_K as MOIST_AIR_LIMITS_K
from crossbank_service.rating import _gas_door
from crossbank_service.rating._case import FluidInput
from crossbank_service.rating._faults import Faults

HIGHEST_HUMIDITY = 5.0
"""Humidity ratios above it are steam with some air, not moist air."""


def names(kind: str, *, condensing: bool = False) -> tuple[str, ...]:
    """Slugs of all fluids of a kind (``pure``, ``solution``)."""
    return tuple(
        r.slug for r in properties.fluid_records() if r.kind == kind and (r.condensing or not condensing)
    )


def check_fluid(
    fluid: Fluid, temperature: float, pressure: float, stream: str, faults: Faults
) -> FluidInput | None:
    """Check a fluid at its inlet state.

    Parameters
    ----------
    fluid : Fluid
        Of the contract.
    temperature, pressure : float
        Inlet state [K], [Pa].
    stream : str
        Where the stream stands in the request, ``/outside`` or ``/inside``.
    faults : Faults
        Collects what is wrong.

    Returns
    -------
    FluidInput or None
        None where something is wrong.
    """
    pointer, temperature_pointer = f"{stream}/fluid", f"{stream}/inlet_temperature_k"
    pressure_pointer = f"{stream}/inlet_pressure_pa"
    match fluid:
        case str():
            name = fluid_slug(fluid)
            return _pure(name, temperature, pressure, pointer, temperature_pointer, pressure_pointer, faults)
        case Pure():
            name = fluid_slug(fluid.name)
            at = f"{pointer}/name"
            return _pure(name, temperature, pressure, at, temperature_pointer, pressure_pointer, faults)
        case Solution():
            return _solution(fluid, temperature, pointer, temperature_pointer, faults)
        case MoistAir():
            return _moist_air(fluid, temperature, pressure, pointer, temperature_pointer, faults)
        case GasMixture():
            return _gas_door.gas_mixture(fluid, temperature, pressure, stream, faults)
        case CombustionGas():
            return _gas_door.combustion_gas(fluid, temperature, pressure, stream, faults)
        case Table():
            return _table(fluid, temperature, temperature_pointer, faults)


def unknown(name: str, kind: str, pointer: str, faults: Faults, *, condensing: bool = False) -> None:
    """Refuse a fluid that is not known, with what is."""
    known = names(kind, condensing=condensing)
    use = " that can condense" if condensing else ""
    faults.reject(
        pointer,
        f"'{name}' is not a {kind} fluid{use} of this service; /v1/fluids lists them.",
        name,
        one_of=known,
    )


def _pure(
    name: str,
    temperature: float,
    pressure: float,
    pointer: str,
    temperature_pointer: str,
    pressure_pointer: str,
    faults: Faults,
) -> FluidInput | None:
    if name not in names("pure"):
        unknown(name, "pure", pointer, faults)
        return None
    phase = properties.phase_at(name, temperature, pressure)
    if phase == "liquid" or phase == "gas":  # noqa: PLR1714  the type checker narrows by it
        return FluidInput(("pure", name, phase), (), gas=phase == "gas")
    said, at_least, at_most, member = why_not(name, phase, pressure)
    if member == "pressure":
        faults.refuse(pressure_pointer, said, pressure, "Pa", at_most=at_most)
    else:
        faults.refuse(temperature_pointer, said, temperature, "K", at_least=at_least, at_most=at_most)
    return None


def why_not(name: str, phase: str, pressure: float) -> tuple[str, float | None, float | None, str]:
    """Why a pure fluid cannot be computed: a sentence, limits, and which of its state is at fault."""
    limits = properties.pure_limits(name)
    low, high = limits.lowest_temperature_k, limits.gas_highest_temperature_k
    match phase:
        case "too-cold":
            return f"{name} is known from {low:.2f} K up.", low, high, "temperature"
        case "too-hot":
            return f"{name} is known up to {high:.2f} K.", low, high, "temperature"
        case "pressure-too-high":
            most = limits.highest_pressure_pa
            return f"{name} is known up to {most:.4g} Pa at this temperature.", None, most, "pressure"
        case _:
            top = limits.liquid_highest_temperature_k
            said = (
                f"{name} at {pressure:.4g} Pa is too near its critical point ({limits.critical_temperature_k:.2f} K) "
                "at this temperature, where properties change too fast for these methods."
            )
            return said, None, top, "temperature"


def _solution(
    fluid: Solution, temperature: float, pointer: str, temperature_pointer: str, faults: Faults
) -> FluidInput | None:
    name = fluid_slug(fluid.name)
    if name not in names("solution"):
        unknown(name, "solution", f"{pointer}/name", faults)
        return None
    limits = properties.solution_limits(name)
    x = fluid.mass_fraction
    if x > limits.highest_mass_fraction:
        faults.refuse(
            f"{pointer}/mass_fraction",
            f"{name} is known up to mass fraction {limits.highest_mass_fraction:g} (mass, not volume).",
            x,
            "1",
            at_least=0.0,
            at_most=limits.highest_mass_fraction,
        )
        return None
    lowest = float(properties.freezing_temperature(name, np.array([x]))[0])
    highest = limits.highest_temperature_k
    if not lowest <= temperature <= highest:
        why = (
            f"{name} at mass fraction {x:g} freezes at {lowest:.2f} K"
            if temperature < lowest
            else f"{name} is known up to {highest:.2f} K"
        )
        faults.refuse(temperature_pointer, f"{why}.", temperature, "K", at_least=lowest, at_most=highest)
        return None
    return FluidInput(("solution", name), (x,), gas=False)


def _moist_air(
    fluid: MoistAir,
    temperature: float,
    pressure: float,
    pointer: str,
    temperature_pointer: str,
    faults: Faults,
) -> FluidInput | None:
    low, high = MOIST_AIR_LIMITS_K
    if not low <= temperature <= high:
        faults.refuse(
            temperature_pointer,
            f"Moist air is known from {low:g} to {high:g} K.",
            temperature,
            "K",
            at_least=low,
            at_most=high,
        )
        return None
    saturated = float(psychrometrics.humidity_ratio_from_relative_humidity(temperature, 1.0, pressure))
    if fluid.relative_humidity is not None:
        member, value = "relative_humidity", fluid.relative_humidity
        w = float(psychrometrics.humidity_ratio_from_relative_humidity(temperature, value, pressure))
        if not np.isfinite(w) or w > HIGHEST_HUMIDITY:
            highest = pressure / float(psychrometrics.saturation_pressure(temperature))
            faults.refuse(
                f"{pointer}/{member}",
                f"At {temperature:g} K this relative humidity is a vapour pressure near or above the total pressure; "
                "give the humidity ratio or the dew point instead.",
                value,
                "1",
                at_most=highest,
            )
            return None
    elif fluid.humidity_ratio is not None:
        member, value, w = "humidity_ratio", fluid.humidity_ratio, fluid.humidity_ratio
    elif fluid.wet_bulb_temperature_k is not None:
        member, value = "wet_bulb_temperature_k", fluid.wet_bulb_temperature_k
        w = float(psychrometrics.humidity_ratio_from_wet_bulb(temperature, value, pressure))
        if value > temperature:
            faults.refuse(
                f"{pointer}/{member}",
                "The wet bulb cannot be above the dry bulb.",
                value,
                "K",
                at_most=temperature,
            )
            return None
        if w < -1e-9:
            driest = float(psychrometrics.wet_bulb(temperature, 0.0, pressure))
            faults.refuse(
                f"{pointer}/{member}",
                f"Even dry air at {temperature:g} K has a wet bulb of {driest:.2f} K.",
                value,
                "K",
                at_least=driest,
            )
            return None
        w = max(w, 0.0)
    else:
        member, value = "dew_point_temperature_k", given(fluid.dew_point_temperature_k)
        w = float(psychrometrics.humidity_ratio_from_dew_point(value, pressure))
    if w > saturated * (1.0 + 1e-6) or not w <= HIGHEST_HUMIDITY:
        faults.refuse(
            f"{pointer}/{member}",
            f"Air at {temperature:g} K and {pressure:g} Pa holds at most "
            f"{min(saturated, HIGHEST_HUMIDITY):.5g} kg of vapour a kg of dry air; this is more.",
            value,
            "kg/kg" if member == "humidity_ratio" else ("1" if member == "relative_humidity" else "K"),
        )
        return None
    return FluidInput(("moist-air",), (w,), gas=True)


def reference_state(fluid: FluidInput, temperature: float, pressure: float) -> str | None:
    """Why the density at a reference state cannot be told; None where it can."""
    match fluid.family[0]:
        case "pure":
            phase = properties.phase_at(fluid.family[1], temperature, pressure)
            if phase != fluid.family[2]:
                return f"At the reference state the fluid is not the {fluid.family[2]} it is at the inlet ({phase})."
        case "table":
            t = fluid.numbers[0]
            assert isinstance(t, tuple)
            if len(t) > 1 and not t[0] <= temperature <= t[-1]:
                return f"The fluid's table runs from {t[0]:g} to {t[-1]:g} K."
    return None


def _table(fluid: Table, temperature: float, temperature_pointer: str, faults: Faults) -> FluidInput | None:
    t = tuple(fluid.temperature_k)
    if len(t) > 1 and not t[0] <= temperature <= t[-1]:
        faults.refuse(
            temperature_pointer,
            f"The fluid's table runs from {t[0]:g} to {t[-1]:g} K.",
            temperature,
            "K",
            at_least=t[0],
            at_most=t[-1],
        )
        return None
    gas = bool(fluid.gas)
    family = ("table", "gas" if gas else "liquid")
    numbers = (
        t,
        tuple(fluid.density_kg_m3),
        tuple(fluid.heat_capacity_j_kg_k),
        tuple(fluid.conductivity_w_m_k),
        tuple(fluid.viscosity_pa_s),
        tuple(fluid.enthalpy_j_kg) if fluid.enthalpy_j_kg is not None else None,
        fluid.pressure_pa,
    )
    return FluidInput(family, numbers, gas=gas)
