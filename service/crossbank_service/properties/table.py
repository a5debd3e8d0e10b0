"""A caller's own fluid, given by points over temperature."""

from collections.abc import Sequence
from dataclasses import dataclass
from typing import Self

import numpy as np
from numpy.typing import NDArray

from crossbank_service.properties._arrays import locate, pad, pick, spread
from crossbank_service.properties.medium import Array, State


@dataclass(frozen=True, slots=True, kw_only=True)
class TablePoints:
    """One case's points; sequences of equal length, temperatures rising.

    Attributes
    ----------
    temperature_k, density_kg_m3, heat_capacity_j_kg_k, conductivity_w_m_k, viscosity_pa_s : sequence of float
        One point means constant properties.
    enthalpy_j_kg : sequence of float or None
        Specific enthalpy at the points; None: the integral of the heat capacity.
    pressure_pa : float or None
        Pressure the densities belong to; a gas's density is scaled with the pressure when it is given.
    """

    temperature_k: Sequence[float]
    density_kg_m3: Sequence[float]
    heat_capacity_j_kg_k: Sequence[float]
    conductivity_w_m_k: Sequence[float]
    viscosity_pa_s: Sequence[float]
    enthalpy_j_kg: Sequence[float] | None = None
    pressure_pa: float | None = None


@dataclass(frozen=True, slots=True, kw_only=True)
class Table:
    """Fluids given by points, padded to equal length; build with ``Table.of``.

    Attributes
    ----------
    temperature_k : Array
        Shape (N, K), rising, filled up with ``inf``.
    density_kg_m3, heat_capacity_j_kg_k, conductivity_w_m_k, viscosity_pa_s, enthalpy_j_kg : Array
        Shape (N, K), filled up with the last value.
    enthalpy_given : array of bool
        Shape (N,): whether the enthalpies are the caller's, linear between the points, or the integral of the
        heat capacity, parabolic between them.
    pressure_pa : Array
        Shape (N,); 0 where the density does not follow the pressure.
    gas : bool
        Whether gas forms of the correlations apply.

    Notes
    -----
    Between points density, heat capacity and conductivity are linear in temperature, viscosity is linear in
    its logarithm (ln mu over T), which suits both steep liquids and gases. Outside the points the end
    values are held and the enthalpy goes on linearly with the end's heat capacity. A single point is exact.
    """

    temperature_k: Array
    density_kg_m3: Array
    heat_capacity_j_kg_k: Array
    conductivity_w_m_k: Array
    viscosity_pa_s: Array
    enthalpy_j_kg: Array
    enthalpy_given: NDArray[np.bool_]
    pressure_pa: Array
    gas: bool

    @classmethod
    def of(cls, cases: Sequence[TablePoints], *, gas: bool) -> Self:
        """Build from one set of points a case."""
        temperature = pad([c.temperature_k for c in cases], np.inf)
        heat_capacity = pad([c.heat_capacity_j_kg_k for c in cases], None)
        given = np.array([c.enthalpy_j_kg is not None for c in cases])
        return cls(
            temperature_k=temperature,
            density_kg_m3=pad([c.density_kg_m3 for c in cases], None),
            heat_capacity_j_kg_k=heat_capacity,
            conductivity_w_m_k=pad([c.conductivity_w_m_k for c in cases], None),
            viscosity_pa_s=pad([c.viscosity_pa_s for c in cases], None),
            enthalpy_j_kg=pad([_enthalpies(c) for c in cases], None),
            enthalpy_given=given,
            pressure_pa=np.array([c.pressure_pa or 0.0 for c in cases]),
            gas=gas,
        )

    def at(self, temperature_k: Array, pressure_pa: Array) -> State:
        """Properties at temperatures of shape (N, ...); ``pressure_pa`` broadcasts."""
        t, p = np.broadcast_arrays(np.asarray(temperature_k, dtype=np.float64), pressure_pa)
        index, weight = locate(self.temperature_k, t)

        def linear(values: Array) -> Array:
            low = pick(values, index)
            return np.asarray(low + weight * (pick(values, index + 1) - low))

        density = linear(self.density_kg_m3)
        if self.gas:
            base = spread(self.pressure_pa, t)
            density = density * np.where(base > 0.0, p / np.where(base > 0.0, base, 1.0), 1.0)
        low = pick(self.viscosity_pa_s, index)
        viscosity = low * (pick(self.viscosity_pa_s, index + 1) / low) ** weight
        return State(
            density_kg_m3=density,
            heat_capacity_j_kg_k=linear(self.heat_capacity_j_kg_k),
            conductivity_w_m_k=linear(self.conductivity_w_m_k),
            viscosity_pa_s=viscosity,
        )

    def enthalpy(self, temperature_k: Array, pressure_pa: Array) -> Array:
        """Specific enthalpy [J/kg]: the caller's, else the integral of cp from the first point."""
        t, _ = np.broadcast_arrays(np.asarray(temperature_k, dtype=np.float64), pressure_pa)
        index, weight = locate(self.temperature_k, t)
        low_t = pick(self.temperature_k, index)
        high_t = np.where(weight > 0.0, pick(self.temperature_k, index + 1), low_t)
        step = np.where(weight > 0.0, high_t - low_t, 0.0)
        low_h, low_c = pick(self.enthalpy_j_kg, index), pick(self.heat_capacity_j_kg_k, index)
        high_c = pick(self.heat_capacity_j_kg_k, index + 1)
        linear = low_h + weight * (pick(self.enthalpy_j_kg, index + 1) - low_h)
        here_c = low_c + weight * (high_c - low_c)
        integral = low_h + weight * step * 0.5 * (low_c + here_c)
        inside = np.where(spread(self.enthalpy_given, t), linear, integral)
        return np.asarray(inside + here_c * (t - (low_t + weight * step)))

    def take(self, index: NDArray[np.intp]) -> Self:
        """Select cases by index."""
        return type(self)(
            temperature_k=self.temperature_k[index],
            density_kg_m3=self.density_kg_m3[index],
            heat_capacity_j_kg_k=self.heat_capacity_j_kg_k[index],
            conductivity_w_m_k=self.conductivity_w_m_k[index],
            viscosity_pa_s=self.viscosity_pa_s[index],
            enthalpy_j_kg=self.enthalpy_j_kg[index],
            enthalpy_given=self.enthalpy_given[index],
            pressure_pa=self.pressure_pa[index],
            gas=self.gas,
        )


def _enthalpies(case: TablePoints) -> Sequence[float]:
    if case.enthalpy_j_kg is not None:
        return case.enthalpy_j_kg
    t, c = case.temperature_k, case.heat_capacity_j_kg_k
    out = [0.0]
    for i in range(len(t) - 1):
        out.append(out[-1] + 0.5 * (c[i] + c[i + 1]) * (t[i + 1] - t[i]))
    return out
