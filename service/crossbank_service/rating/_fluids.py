"""Media of the engine from the fluids of checked cases."""

from collections.abc import Sequence
from typing import Any

import numpy as np

from crossbank_service import properties
from crossbank_service.properties import Medium
from crossbank_service.properties.moist_air import TEMPERATURE_LIMITS_K as MOIST_AIR_LIMITS_K
from crossbank_service.rating._arrays import Array
from crossbank_service.rating._case import FluidInput

MARGIN_K = 1.0
"""Beyond the inlet temperatures, so that rounding stays inside [K]."""


def medium_of(fluids: Sequence[FluidInput]) -> Medium:
    """One medium for cases whose fluids are of one family, in order."""
    family = fluids[0].family
    numbers: list[Any] = [fluid.numbers for fluid in fluids]
    match family[0]:
        case "moist-air":
            return properties.MoistAir(np.array([n[0] for n in numbers]))
        case "gas-mixture":
            return properties.GasMixture(np.array(numbers, dtype=np.float64))
        case "pure":
            return properties.PureSinglePhase(family[1], "gas" if fluids[0].gas else "liquid")
        case "solution":
            return properties.Solution(family[1], np.array([n[0] for n in numbers]))
        case _:
            return properties.Table.of([_points(n) for n in numbers], gas=fluids[0].gas)


def local_medium(fluids: Sequence[FluidInput], ends: tuple[Array, Array], pressure: Array) -> Medium:
    """The medium of some cases between their inlet temperatures ``ends`` [K] at ``pressure`` [Pa], arrays (N,)."""
    medium = medium_of(fluids)
    lowest, highest = _limits(medium, pressure)
    low = np.clip(np.minimum(*ends) - MARGIN_K, lowest, highest)
    high = np.clip(np.maximum(*ends) + MARGIN_K, lowest, highest)
    return properties.LocalMedium.of(medium, low, high, pressure)


def _limits(medium: Medium, pressure: Array) -> tuple[Array, Array]:
    """Temperatures between which a medium is itself, and not held at its last value [K]."""
    everywhere = np.full_like(pressure, 1.0)
    match medium:
        case properties.MoistAir():
            return everywhere * MOIST_AIR_LIMITS_K[0], everywhere * MOIST_AIR_LIMITS_K[1]
        case properties.GasMixture():
            return medium.temperature_limits_k
        case properties.Solution():
            freezing = properties.freezing_temperature(medium.name, medium.mass_fraction)
            return freezing, everywhere * properties.solution_limits(medium.name).highest_temperature_k
        case properties.PureSinglePhase():
            limits = properties.pure_limits(medium.name)
            low, top = limits.lowest_temperature_k, limits.liquid_highest_temperature_k
            if top is None:
                return everywhere * low, everywhere * limits.gas_highest_temperature_k
            saturated = properties.Saturation(medium.name).temperature(pressure)
            if medium.gas:
                return np.maximum(
                    low, np.minimum(saturated, top)
                ), everywhere * limits.gas_highest_temperature_k
            return everywhere * low, np.minimum(saturated, top)
    raise TypeError(f"no local form of {type(medium).__name__}")


def _points(numbers: Any) -> properties.TablePoints:
    names = ("temperature_k", "density_kg_m3", "heat_capacity_j_kg_k", "conductivity_w_m_k", "viscosity_pa_s")
    lists = dict(zip(names, numbers[:5], strict=True))
    return properties.TablePoints(**lists, enthalpy_j_kg=numbers[5], pressure_pa=numbers[6])
