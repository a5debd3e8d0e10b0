"""Tables along the saturation line of a pure fluid, built once from its reference equations."""

from dataclasses import dataclass

import numpy as np

from crossbank_service.properties._coolprop import built_once, open_state
from crossbank_service.properties._fluids import fluid
from crossbank_service.properties._limits import pure_limits
from crossbank_service.properties._sampling import fill_line, logarithm
from crossbank_service.properties._splines import Spline1, lobatto
from crossbank_service.properties.medium import Array

COLUMNS = (
    "liquid_density_kg_m3",
    "vapour_density_kg_m3",
    "liquid_enthalpy_j_kg",
    "vapour_enthalpy_j_kg",
    "liquid_heat_capacity_j_kg_k",
    "vapour_heat_capacity_j_kg_k",
    "liquid_viscosity_pa_s",
    "vapour_viscosity_pa_s",
    "liquid_conductivity_w_m_k",
    "vapour_conductivity_w_m_k",
    "surface_tension_n_m",
)
_LOGARITHMIC = (0, 1, 6, 7, 8, 9)
_NODES = 90


@dataclass(frozen=True, slots=True)
class SaturationTable:
    """Saturation line of one fluid.

    The coordinates are q = (1 - T/Tc)^(1/3) and r = (ln(pc/p))^(1/3): along them densities, pressure and
    temperature run almost straight up to the critical point, so few nodes carry them to a few parts in a
    million.
    """

    critical_temperature_k: float
    critical_pressure_pa: float
    molar_mass_kg_mol: float
    lowest_k: float
    highest_k: float
    lowest_pa: float
    highest_pa: float
    has_surface_tension: bool
    _r_of_q: Spline1
    _q_of_r: Spline1
    _values: Spline1

    def q(self, temperature_k: Array) -> Array:
        """Coordinate of a temperature, held within the table."""
        t = np.clip(temperature_k, self.lowest_k, self.highest_k)
        return np.cbrt(1.0 - t / self.critical_temperature_k)

    def pressure(self, temperature_k: Array) -> Array:
        """Saturation pressure [Pa], held at the ends of the table."""
        r = self._r_of_q(self.q(temperature_k))
        return np.asarray(self.critical_pressure_pa * np.exp(-r * r * r))

    def temperature(self, pressure_pa: Array) -> Array:
        """Saturation temperature [K], held at the ends of the table."""
        return self._temperature(self._r(pressure_pa))

    def values(self, pressure_pa: Array) -> tuple[Array, Array]:
        """Saturation temperature, and the quantities of ``COLUMNS`` in an array of shape (M, ...)."""
        r = self._r(pressure_pa)
        table = np.ascontiguousarray(np.moveaxis(self._values(r), -1, 0))
        for i in _LOGARITHMIC:
            table[i] = np.exp(table[i])
        return self._temperature(r), table

    def _r(self, pressure_pa: Array) -> Array:
        p = np.clip(pressure_pa, self.lowest_pa, self.highest_pa)
        return np.cbrt(np.log(self.critical_pressure_pa / p))

    def _temperature(self, r: Array) -> Array:
        q = self._q_of_r(r)
        return np.asarray(self.critical_temperature_k * (1.0 - q * q * q))


def _water_surface_tension(temperature_k: float) -> float:
    """Surface tension of water [N/m], IAPWS R1-76(2014); CoolProp's own fit is up to 1 % off."""
    x = 1.0 - temperature_k / 647.096
    return float(0.2358 * x**1.256 * (1.0 - 0.625 * x))


@built_once
def saturation_table(slug: str) -> SaturationTable:
    """Build the saturation table of a fluid; about 10 ms."""
    import CoolProp  # noqa: PLC0415

    limits = pure_limits(slug)
    top = limits.saturation_highest_temperature_k
    if top is None:
        raise KeyError(f"{slug} is offered as a gas only")
    state = open_state("HEOS", fluid(slug).equation)
    lowest, critical_k, critical_pa = (
        limits.lowest_temperature_k,
        limits.critical_temperature_k,
        limits.critical_pressure_pa,
    )
    ends = np.cbrt(1.0 - np.array([lowest, top]) / critical_k)
    nodes = lobatto(ends[0], ends[1], _NODES)
    temperatures = critical_k * (1.0 - nodes**3)
    temperatures[0], temperatures[-1] = lowest, top
    pressures, rows = [], []
    tension = True
    for t in temperatures:
        row: list[float] = [0.0] * len(COLUMNS)
        for offset in (0, 1):
            state.update(CoolProp.QT_INPUTS, float(offset), t)
            row[offset] = np.log(state.rhomass())
            row[2 + offset], row[4 + offset] = state.hmass(), state.cpmass()
            row[6 + offset], row[8 + offset] = logarithm(state.viscosity), logarithm(state.conductivity)
        try:
            row[10] = _water_surface_tension(t) if slug == "water" else state.surface_tension()
        except ValueError:
            tension = False
        pressures.append(state.p())
        rows.append(row)
    p, values = np.array(pressures), np.array(rows)
    for column in (6, 7, 8, 9):
        fill_line(slug, nodes, values[:, column])
    r = np.cbrt(np.log(critical_pa / p))
    return SaturationTable(
        critical_temperature_k=critical_k,
        critical_pressure_pa=critical_pa,
        molar_mass_kg_mol=limits.molar_mass_kg_mol,
        lowest_k=lowest,
        highest_k=top,
        lowest_pa=float(p[0]),
        highest_pa=float(p[-1]),
        has_surface_tension=tension,
        _r_of_q=Spline1(nodes, r),
        _q_of_r=Spline1(r, nodes),
        _values=Spline1(r, values),
    )
