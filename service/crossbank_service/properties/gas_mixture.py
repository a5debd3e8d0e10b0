"""A mixture of low-density gases of given composition."""

from collections.abc import Mapping
from dataclasses import dataclass
from types import MappingProxyType
from typing import ClassVar, Self

import numpy as np
from numpy.typing import NDArray

from crossbank_service.properties import ideal_mixture
from crossbank_service.properties._arrays import spread
from crossbank_service.properties._gas_data import SPECIES
from crossbank_service.properties.medium import Array, State

GASES: tuple[str, ...] = tuple(SPECIES)
"""Names of the gases a mixture may hold, in the order of the columns of ``mole_fractions``."""

MOLAR_MASSES_KG_MOL: MappingProxyType[str, float] = MappingProxyType(
    {name: gas.molar_mass_kg_mol for name, gas in SPECIES.items()}
)

TEMPERATURE_LIMITS_K = (200.0, 1800.0)
"""Where the fits of the common gases hold."""

COUNTED_MOLE_FRACTION = 0.01
"""From this content up a gas's own fitted range narrows the limits of a mixture."""


@dataclass(frozen=True, slots=True)
class GasMixture:
    """Low-density gas mixture (flue gas, process gas) in N cases.

    Attributes
    ----------
    mole_fractions : Array
        Shape (N, len(GASES)), columns in the order of ``GASES``, each row adding to 1.

    Notes
    -----
    See ``ideal_mixture`` for formulas and sources. The pure-gas values carry the errors stated by
    ``SPECIES``; the mixing rules add 1-2 % in viscosity and 3-4 % in conductivity.
    """

    mole_fractions: Array
    gas: ClassVar[bool] = True

    @classmethod
    def of(cls, mole_fractions: Mapping[str, Array | float]) -> Self:
        """Build from mole fractions by gas name, floats or arrays of shape (N,); normalised to add to 1."""
        unknown = set(mole_fractions) - set(GASES)
        if unknown:
            raise KeyError(f"unknown gas {min(unknown)!r}; known gases: {', '.join(GASES)}")
        given = {name: np.atleast_1d(np.asarray(v, dtype=np.float64)) for name, v in mole_fractions.items()}
        cases = max((v.size for v in given.values()), default=1)
        columns = np.zeros((cases, len(GASES)))
        total = np.zeros(cases)
        for i, name in enumerate(GASES):
            if name in given:
                columns[:, i] = given[name]
                total = total + columns[:, i]
        return cls(columns / total[:, None])

    def _portions(self, like: Array) -> list[ideal_mixture.Portion]:
        # a gas absent from every case is left out; it would add exact zeros
        columns = [np.ascontiguousarray(self.mole_fractions[:, i]) for i in range(len(GASES))]
        pairs = zip(SPECIES.values(), columns, strict=True)
        return [(species, spread(y, like)) for species, y in pairs if np.any(y != 0.0)]

    @property
    def molar_mass_kg_mol(self) -> Array:
        """Molar mass of shape (N,)."""
        cases = np.zeros(len(self.mole_fractions))
        return ideal_mixture.molar_mass(self._portions(cases))

    @property
    def temperature_limits_k(self) -> tuple[Array, Array]:
        """Lowest and highest temperature of each mixture [K], shape (N,): where the fits of all its gases hold."""
        low = np.full(len(self.mole_fractions), TEMPERATURE_LIMITS_K[0])
        high = np.full(len(self.mole_fractions), TEMPERATURE_LIMITS_K[1])
        for i, species in enumerate(SPECIES.values()):
            counts = self.mole_fractions[:, i] >= COUNTED_MOLE_FRACTION
            if not counts.any():
                continue
            low = np.where(counts, np.maximum(low, species.low_k), low)
            high = np.where(counts, np.minimum(high, species.high_k), high)
        return low, high

    def at(self, temperature_k: Array, pressure_pa: Array) -> State:
        """Properties at temperatures of shape (N, ...); ``pressure_pa`` broadcasts."""
        return ideal_mixture.state(self._portions(temperature_k), temperature_k, pressure_pa)

    def enthalpy(self, temperature_k: Array, pressure_pa: Array) -> Array:  # noqa: ARG002
        """Specific enthalpy [J/kg]; an ideal gas's does not depend on the pressure."""
        return ideal_mixture.enthalpy(self._portions(temperature_k), temperature_k)

    def take(self, index: NDArray[np.intp]) -> Self:
        """Select cases by index."""
        return type(self)(self.mole_fractions[index])
