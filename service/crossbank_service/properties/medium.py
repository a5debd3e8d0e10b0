"""What the engine asks of a fluid: properties of N cases at once, case axis first."""

from dataclasses import dataclass
from typing import Protocol, Self

import numpy as np
from numpy.typing import NDArray

Array = NDArray[np.float64]


@dataclass(frozen=True, slots=True)
class State:
    """Properties at given temperatures; every array has the shape of the temperatures asked for."""

    density_kg_m3: Array
    heat_capacity_j_kg_k: Array
    conductivity_w_m_k: Array
    viscosity_pa_s: Array

    @property
    def prandtl(self) -> Array:
        """Prandtl number."""
        return self.heat_capacity_j_kg_k * self.viscosity_pa_s / self.conductivity_w_m_k


class Medium(Protocol):
    """One kind of fluid in N cases.

    Arrays asked for have shape (N, ...): parameters of the case (composition, mass fraction) are held with
    shape (N,) and spread over the trailing axes. Values are extended smoothly and finitely beyond the
    limits, so that a solver may step outside; judging the final state is the caller's part.
    """

    @property
    def gas(self) -> bool:
        """Whether gas forms of the correlations apply (else liquid)."""
        ...

    def at(self, temperature_k: Array, pressure_pa: Array) -> State:
        """Properties; ``pressure_pa`` broadcasts against ``temperature_k``."""
        ...

    def enthalpy(self, temperature_k: Array, pressure_pa: Array) -> Array:
        """Specific enthalpy in J/kg, consistent with the heat capacity of ``at``; any zero."""
        ...

    def take(self, index: NDArray[np.intp]) -> Self:
        """Select cases by index."""
        ...
