"""Gases by composition at the door: mixtures and the flue gas of a fuel, as mole fractions."""

import msgspec
import numpy as np

from crossbank.contract import Assumed, CombustionGas, GasMixture, RateRequest, SinglePhase, given
from crossbank_service import properties
from crossbank_service.properties import GASES
from crossbank_service.properties.fuels import MEMBERS
from crossbank_service.properties.real_gas import HIGHEST_DEVIATION
from crossbank_service.rating._case import FluidInput
from crossbank_service.rating._composition import Composition, composition_of, gas_limits
from crossbank_service.rating._faults import Faults

SUM_TOLERANCE = 1e-3
"""Fractions whose sum is no further from 1 are rounded ones: they are normalised."""

AIR_OXYGEN = 0.20946
MOST_EXCESS_AIR = 1000.0

SULFUR_TRIOXIDE_SHARE = 0.02
"""Of the sulfur dioxide, for the acid dew point: the default of ``sulfur_trioxide_mole_fraction``."""


def gas_mixture(
    fluid: GasMixture, temperature: float, pressure: float, stream: str, faults: Faults
) -> FluidInput | None:
    """Check a mixture of given mole fractions at its inlet state; None where something is wrong."""
    pointer = f"{stream}/fluid/mole_fractions"
    parts = msgspec.structs.asdict(fluid.mole_fractions)
    if not _adds_to_one(sum(parts.values()), pointer, "mole fractions", faults):
        return None
    total = sum(parts.values())
    numbers = tuple(parts[name] / total for name in GASES)
    return _at_inlet(FluidInput(("gas-mixture",), numbers), temperature, pressure, stream, faults)


def combustion_gas(
    fluid: CombustionGas, temperature: float, pressure: float, stream: str, faults: Faults
) -> FluidInput | None:
    """Check the flue gas of a fuel at its inlet state; None where something is wrong."""
    pointer = f"{stream}/fluid"
    parts = {name: given(getattr(fluid, name)) for name in MEMBERS}
    total = sum(parts.values())
    if not _adds_to_one(total, pointer, "mass fractions of the fuel, water and ash counted,", faults):
        return None
    fuel = {name: value / total for name, value in parts.items()}
    need = fuel["carbon"] / 12.011 + fuel["hydrogen"] / 4.032 + fuel["sulfur"] / 32.06
    need -= fuel["oxygen"] / 31.998
    if need <= 1e-6:
        faults.refuse(
            f"{pointer}/carbon",
            "This fuel needs no air: its carbon, hydrogen and sulfur are already burnt by its own oxygen, or there is "
            "none.",
            parts["carbon"],
            "1",
        )
        return None
    products = properties.combustion_products(
        **{name: value for name, value in fuel.items() if name != "ash"},
        excess_air=fluid.excess_air,
        dry_oxygen_mole_fraction=fluid.dry_oxygen_mole_fraction,
        air_humidity_ratio=given(fluid.air_humidity_ratio),
    )
    if float(products.excess_air[0]) > MOST_EXCESS_AIR:
        faults.refuse(
            f"{pointer}/dry_oxygen_mole_fraction",
            "With so much oxygen left next to no fuel has burnt; write moist air instead.",
            fluid.dry_oxygen_mole_fraction,
            "1",
            at_most=AIR_OXYGEN,
        )
        return None
    numbers = tuple(max(float(products.mole_fractions.get(name, np.zeros(1))[0]), 0.0) for name in GASES)
    return _at_inlet(FluidInput(("gas-mixture",), numbers), temperature, pressure, stream, faults)


def gas_assumptions(request: RateRequest, outside: Composition | None) -> tuple[Assumed, ...]:
    """What an answer about a gas by composition takes for granted."""
    out = []
    streams = [("/outside/fluid", request.outside.fluid)]
    if isinstance(request.inside, SinglePhase):
        streams.append(("/inside/fluid", request.inside.fluid))
    out += [
        Assumed(pointer=f"{pointer}/air_humidity_ratio", value=0.0, unit="kg/kg", why="dry combustion air")
        for pointer, fluid in streams
        if isinstance(fluid, CombustionGas) and fluid.air_humidity_ratio == 0.0
    ]
    if outside is not None and outside.sulfur_dioxide > 0.0:
        out.append(
            Assumed(
                pointer="/outside/fluid",
                value=SULFUR_TRIOXIDE_SHARE,
                unit="1",
                why="sulfur trioxide over sulfur dioxide, for the acid dew point; 0.005 to 0.05 occur",
            )
        )
    return tuple(out)


def departure(fluid: FluidInput, temperature: float, pressure: float) -> float:
    """How far the density of a gas mixture is from the ideal gas's, as a fraction of it; an estimate."""
    z = properties.compressibility(np.array([fluid.numbers]), np.array([temperature]), np.array([pressure]))
    return abs(float(z[0]) - 1.0)


def _adds_to_one(total: float, pointer: str, what: str, faults: Faults) -> bool:
    if abs(total - 1.0) <= SUM_TOLERANCE:
        return True
    said = f"The {what} add to {total:.6g}; they must add to 1 within {SUM_TOLERANCE:g}."
    if 90.0 < total < 110.0:
        said += " They look like percent: divide them by 100."
    faults.refuse(pointer, said, total, "1", at_least=1.0 - SUM_TOLERANCE, at_most=1.0 + SUM_TOLERANCE)
    return False


def _at_inlet(
    fluid: FluidInput, temperature: float, pressure: float, stream: str, faults: Faults
) -> FluidInput | None:
    low, high = gas_limits(fluid)
    if not low <= temperature <= high:
        faults.refuse(
            f"{stream}/inlet_temperature_k",
            f"This gas mixture is known from {low:g} to {high:g} K.",
            temperature,
            "K",
            at_least=low,
            at_most=high,
        )
        return None
    found = composition_of(fluid)
    assert found is not None
    if found.saturates(temperature + 1e-6, pressure):
        dew = found.dew_point(pressure)
        faults.refuse(
            f"{stream}/inlet_temperature_k",
            f"The gas holds a mole fraction of {found.water:.5g} of water and enters below its dew point {dew:.2f} K: "
            "part of it would already be mist.",
            temperature,
            "K",
            at_least=dew,
        )
        return None
    off = departure(fluid, temperature, pressure)
    if off > HIGHEST_DEVIATION:
        faults.refuse(
            f"{stream}/inlet_pressure_pa",
            f"At {pressure:.4g} Pa and {temperature:g} K this mixture is some {off:.0%} off the ideal gas it is rated "
            f"as; {HIGHEST_DEVIATION:.0%} are taken.",
            pressure,
            "Pa",
        )
        return None
    return fluid
