"""Humid air as a medium: dry air as one gas, and steam."""

from dataclasses import dataclass
from typing import ClassVar, Self

import numpy as np
from numpy.typing import NDArray

from crossbank_service.properties import ideal_mixture
from crossbank_service.properties._arrays import spread
from crossbank_service.properties._gas_data import DRY_AIR, WATER
from crossbank_service.properties.medium import Array, State

MASS_RATIO = 0.621945
"""Molar mass of water over that of dry air [-], as in the ASHRAE psychrometric tables."""

DRY_MOLAR_MASS_KG_MOL = DRY_AIR.molar_mass_kg_mol
"""Molar mass of dry air."""

TEMPERATURE_LIMITS_K = (150.0, 1800.0)


@dataclass(frozen=True, slots=True)
class MoistAir:
    """Humid air of given humidity ratio in N cases; nothing condenses in it.

    Attributes
    ----------
    humidity_ratio : Array
        kg of water vapour a kg of dry air [-], shape (N,).

    Notes
    -----
    Properties are those of the humid air, per kg of it (dry air and vapour together). Heat capacities are
    within 0.1 % of the real mixture at low pressure; viscosity within 2 %, conductivity 3 %; density, as an
    ideal gas, within 0.2 % up to 3 bar above 320 K. Range 150 to 1800 K.
    """

    humidity_ratio: Array
    gas: ClassVar[bool] = True

    @property
    def water_mole_fraction(self) -> Array:
        """Mole fraction of water vapour, W/(W + M_w/M_a), shape (N,)."""
        return np.asarray(self.humidity_ratio / (self.humidity_ratio + MASS_RATIO))

    def _portions(self, like: Array) -> list[ideal_mixture.Portion]:
        y = spread(self.water_mole_fraction, like)
        return [(DRY_AIR, 1.0 - y), (WATER, y)]

    def at(self, temperature_k: Array, pressure_pa: Array) -> State:
        """Properties at temperatures of shape (N, ...); ``pressure_pa`` broadcasts."""
        return ideal_mixture.state(self._portions(temperature_k), temperature_k, pressure_pa)

    def enthalpy(self, temperature_k: Array, pressure_pa: Array) -> Array:  # noqa: ARG002
        """Sensible enthalpy [J/kg of humid air], 0 at 273.15 K for dry air and for vapour."""
        return ideal_mixture.enthalpy(self._portions(temperature_k), temperature_k)

    def take(self, index: NDArray[np.intp]) -> Self:
        """Select cases by index."""
        return type(self)(self.humidity_ratio[index])
