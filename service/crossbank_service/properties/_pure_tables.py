"""Two-coordinate tables of a pure fluid's single-phase regions, built once from its reference equations.

Regions, each in coordinates along which the properties run smoothly and which keep clear of the critical
point:

=========  ==========================================  =============================================
liquid     lowest temperature to 0.96 Tc               q = (1 - T/Tc)^(1/3), y = sqrt((p - ps)/(pmax - ps))
vapour     lowest temperature to T1 = 0.96 Tc          q, y = p/ps(T)
bridge     T1 to T2 = 1.2 Tc, at most the density of   T, y = p/p(T, that density)
           saturated vapour at T1
hot        T2 up, at most 0.8 of  the critical density  ln T, y = p/p(T, that density)
=========  ==========================================  =============================================
"""

from collections.abc import Callable
from dataclasses import dataclass
from typing import Any

import numpy as np

from crossbank_service.properties._coolprop import built_once, open_state
from crossbank_service.properties._fluids import fluid
from crossbank_service.properties._gas_data import R
from crossbank_service.properties._limits import HOT, pure_limits
from crossbank_service.properties._sampling import fill_grid, logarithm
from crossbank_service.properties._saturation_table import SaturationTable, saturation_table
from crossbank_service.properties._splines import Spline1, Spline2, lobatto
from crossbank_service.properties.medium import Array

HOT_DENSITY = 0.8
"""The hot table reaches this share of the critical density."""
_LEAST_SHARE = 1e-6
"""Stands for zero pressure, as a share of a table's highest."""


@dataclass(frozen=True, slots=True)
class LiquidTable:
    """Compressed liquid; columns density, cp, ln viscosity, ln conductivity, enthalpy."""

    saturation: SaturationTable
    lowest_k: float
    highest_k: float
    highest_pa: float
    values: Spline2


@dataclass(frozen=True, slots=True)
class GasTable:
    """Gas; columns Z, cp, ln viscosity, ln conductivity, enthalpy."""

    saturation: SaturationTable | None
    molar_mass_kg_mol: float
    critical_temperature_k: float
    lowest_k: float
    highest_k: float
    highest_pa: float
    vapour_top_k: float
    bridge_top_k: float
    vapour: Spline2 | None
    bridge: Spline2 | None
    bridge_limit: Spline1 | None
    hot: Spline2 | None
    hot_limit: Spline1 | None
    coldest_beyond: Spline1

    def coldest(self, pressure_pa: Array) -> Array:
        """Lowest temperature of the tables at a pressure [K]: saturation, then the denser regions' edges."""
        beyond = self.coldest_beyond(np.log(pressure_pa))
        if self.saturation is None:
            return beyond
        saturated = np.minimum(self.saturation.temperature(pressure_pa), self.vapour_top_k)
        return np.where(saturated < self.vapour_top_k, saturated, beyond)

    def limit(self, temperature_k: Array) -> Array:
        """Highest pressure of the tables at a temperature [Pa], ignoring ``highest_pa``."""
        t = np.clip(temperature_k, self.lowest_k, self.highest_k)
        out = np.full_like(t, np.inf)
        if self.saturation is not None:
            out = self.saturation.pressure(t)
        if self.bridge_limit is not None:
            out = np.where(t > self.vapour_top_k, np.exp(self.bridge_limit(t)), out)
        if self.hot_limit is not None:
            hot = t > self.bridge_top_k if self.bridge is not None else t > 0.0
            out = np.where(hot, np.exp(self.hot_limit(np.log(t))), out)
        return out


def _sample(
    state: Any,
    temperatures: Array,
    shares: Array,
    pressure: Callable[[float, float], float],
    phase: int | None,
) -> Array:
    """Table of shape (temperatures, shares, 5) read from the equations at given pressures."""
    import CoolProp  # noqa: PLC0415

    out = np.empty((len(temperatures), len(shares), 5))
    if phase is not None:
        state.specify_phase(phase)
    for i, t in enumerate(temperatures):
        for j, y in enumerate(shares):
            state.update(CoolProp.PT_INPUTS, pressure(float(t), float(y)), float(t))
            viscosity, conductivity = logarithm(state.viscosity), logarithm(state.conductivity)
            out[i, j] = (state.rhomass(), state.cpmass(), viscosity, conductivity, state.hmass())
    if phase is not None:
        state.unspecify_phase()
    for column in (2, 3):
        fill_grid(state.name(), temperatures, shares, out[..., column])
    return out


@built_once
def liquid_table(slug: str) -> LiquidTable:
    """Build the liquid table of a fluid; 10 to 60 ms."""
    import CoolProp  # noqa: PLC0415

    saturation = saturation_table(slug)
    limits = pure_limits(slug)
    top_k, top_pa = limits.liquid_highest_temperature_k, limits.highest_pressure_pa
    if top_k is None:
        raise KeyError(f"{slug} is offered as a gas only")
    state = open_state("HEOS", fluid(slug).equation)
    ends = saturation.q(np.array([saturation.lowest_k, top_k]))
    q = lobatto(ends[0], ends[1], 56)
    temperatures = saturation.critical_temperature_k * (1.0 - q**3)
    shares = np.linspace(0.0, 1.0, 20)
    saturated = dict(zip(temperatures.tolist(), saturation.pressure(temperatures).tolist(), strict=True))

    def pressure(t: float, y: float) -> float:
        return float(saturated[t] * (1.0 - y * y) + top_pa * y * y)

    values = _sample(state, temperatures, shares, pressure, CoolProp.iphase_liquid)
    return LiquidTable(saturation, saturation.lowest_k, top_k, top_pa, Spline2(q, shares, values))


@built_once
def gas_table(slug: str) -> GasTable:
    """Build the gas table of a fluid; 15 to 150 ms."""
    import CoolProp  # noqa: PLC0415

    bounds = pure_limits(slug)
    state = open_state("HEOS", fluid(slug).equation)
    critical_k, mass = bounds.critical_temperature_k, bounds.molar_mass_kg_mol
    lowest_k, highest_k = bounds.lowest_temperature_k, bounds.gas_highest_temperature_k
    highest_pa = bounds.highest_pressure_pa
    gas_constant = R / mass
    vapour_top, bridge_top = bounds.liquid_highest_temperature_k, HOT * critical_k
    saturation = None if vapour_top is None else saturation_table(slug)

    def compressibility(values: Array, temperatures: Array, pressures: Array) -> Array:
        values[..., 0] = pressures / (values[..., 0] * gas_constant * temperatures[:, None])
        return values

    def isochore(density: float, temperatures: Array) -> Array:
        out = []
        for t in temperatures:
            state.update(CoolProp.DmassT_INPUTS, density, float(t))
            out.append(state.p())
        return np.array(out)

    def region(
        coordinate: Array, temperatures: Array, limits: Array, nodes: int, phase: int | None
    ) -> Spline2:
        shares = lobatto(0.0, 1.0, nodes)
        by_t = dict(zip(temperatures.tolist(), limits.tolist(), strict=True))
        values = _sample(state, temperatures, shares, lambda t, y: by_t[t] * max(y, _LEAST_SHARE), phase)
        pressures = limits[:, None] * np.maximum(shares, _LEAST_SHARE)
        return Spline2(coordinate, shares, compressibility(values, temperatures, pressures))

    vapour = bridge = hot = None
    bridge_limit = hot_limit = None
    edge_t, edge_p = [np.array([lowest_k])], [np.array([1.0])]
    dense = np.linspace(0.0, 1.0, 200)
    if saturation is not None and vapour_top is not None:
        ends = saturation.q(np.array([saturation.lowest_k, vapour_top]))
        q = lobatto(ends[0], ends[1], 44)
        temperatures = critical_k * (1.0 - q**3)
        limits = saturation.pressure(temperatures)
        vapour = region(q, temperatures, limits, 18, CoolProp.iphase_gas)
        edge_t, edge_p = [np.array([vapour_top])], [limits[-1:]]
        state.update(CoolProp.QT_INPUTS, 1.0, vapour_top)
        temperatures = lobatto(vapour_top, min(bridge_top, highest_k), 32)
        limits = isochore(state.rhomass(), temperatures)
        bridge = region(temperatures, temperatures, limits, 18, CoolProp.iphase_gas)
        bridge_limit = Spline1(temperatures, np.log(limits))
        edge_t.append(temperatures[0] + dense[1:] * (temperatures[-1] - temperatures[0]))
        edge_p.append(np.exp(bridge_limit(edge_t[-1])))
    if highest_k > bridge_top * 1.01:
        start = max(bridge_top, lowest_k)
        log_t = np.linspace(np.log(start), np.log(highest_k), 48)
        temperatures = np.exp(log_t)
        limits = isochore(HOT_DENSITY * state.rhomass_critical(), temperatures)
        hot = region(log_t, temperatures, limits, 20, CoolProp.iphase_supercritical_gas)
        hot_limit = Spline1(log_t, np.log(limits))
        edge_t.append(np.exp(log_t[0] + dense * (log_t[-1] - log_t[0])))
        edge_p.append(np.exp(hot_limit(np.log(edge_t[-1]))))
    edge_temperature, edge_pressure = np.concatenate(edge_t), np.log(np.concatenate(edge_p))
    return GasTable(
        saturation=saturation,
        molar_mass_kg_mol=mass,
        critical_temperature_k=critical_k,
        lowest_k=lowest_k,
        highest_k=highest_k,
        highest_pa=highest_pa,
        vapour_top_k=vapour_top or 0.0,
        bridge_top_k=bridge_top,
        vapour=vapour,
        bridge=bridge,
        bridge_limit=bridge_limit,
        hot=hot,
        hot_limit=hot_limit,
        coldest_beyond=Spline1(edge_pressure, edge_temperature, degree=1),
    )
