"""Saturated pure fluids: what a condensing or evaporating side asks for."""

from dataclasses import dataclass

import numpy as np

from crossbank_service.properties._fluids import FLUIDS, fluid
from crossbank_service.properties._saturation_table import saturation_table
from crossbank_service.properties.medium import Array


@dataclass(frozen=True, slots=True, kw_only=True)
class SaturatedState:
    """Saturated liquid and vapour; every array has the shape of the pressures asked for.

    ``surface_tension_n_m`` is None for a fluid without a surface-tension equation.
    """

    temperature_k: Array
    pressure_pa: Array
    reduced_pressure: Array
    liquid_density_kg_m3: Array
    vapour_density_kg_m3: Array
    liquid_viscosity_pa_s: Array
    vapour_viscosity_pa_s: Array
    liquid_conductivity_w_m_k: Array
    vapour_conductivity_w_m_k: Array
    liquid_heat_capacity_j_kg_k: Array
    vapour_heat_capacity_j_kg_k: Array
    liquid_enthalpy_j_kg: Array
    vapour_enthalpy_j_kg: Array
    latent_heat_j_kg: Array
    surface_tension_n_m: Array | None


@dataclass(frozen=True, slots=True)
class Saturation:
    """Saturation line of a pure fluid.

    Attributes
    ----------
    name : str
        Slug of a fluid of the catalogue that can condense.

    Notes
    -----
    One-coordinate splines through the fluid's reference equations (CoolProp), from its lowest temperature
    to 0.99 of the critical temperature; outside, the end values are held. They repeat the equations within
    1e-6, conductivities within 1e-4; the temperature within 1e-6 K.
    """

    name: str

    def __post_init__(self) -> None:
        if fluid(self.name).supercritical_only:
            known = ", ".join(s for s, f in FLUIDS.items() if not f.supercritical_only)
            raise KeyError(f"{self.name!r} is offered as a gas only; fluids that condense: {known}")

    @property
    def hydrocarbon(self) -> bool:
        """Whether hydrocarbon forms of condensing correlations apply."""
        return fluid(self.name).hydrocarbon

    @property
    def pressure_limits_pa(self) -> tuple[float, float]:
        """Lowest and highest saturation pressure of the table [Pa]."""
        table = saturation_table(self.name)
        return table.lowest_pa, table.highest_pa

    @property
    def temperature_limits_k(self) -> tuple[float, float]:
        """Lowest and highest saturation temperature of the table [K]."""
        table = saturation_table(self.name)
        return table.lowest_k, table.highest_k

    @property
    def critical_pressure_pa(self) -> float:
        """Critical pressure [Pa]."""
        return saturation_table(self.name).critical_pressure_pa

    def pressure(self, temperature_k: Array) -> Array:
        """Saturation pressure [Pa]."""
        return saturation_table(self.name).pressure(np.asarray(temperature_k, dtype=np.float64))

    def temperature(self, pressure_pa: Array) -> Array:
        """Saturation temperature [K]."""
        return saturation_table(self.name).temperature(np.asarray(pressure_pa, dtype=np.float64))

    def at(self, pressure_pa: Array) -> SaturatedState:
        """Saturated liquid and vapour at pressures of any shape."""
        p = np.asarray(pressure_pa, dtype=np.float64)
        table = saturation_table(self.name)
        temperature, v = table.values(p)
        return SaturatedState(
            temperature_k=temperature,
            pressure_pa=p,
            reduced_pressure=p / table.critical_pressure_pa,
            liquid_density_kg_m3=v[0],
            vapour_density_kg_m3=v[1],
            liquid_enthalpy_j_kg=v[2],
            vapour_enthalpy_j_kg=v[3],
            latent_heat_j_kg=v[3] - v[2],
            liquid_heat_capacity_j_kg_k=v[4],
            vapour_heat_capacity_j_kg_k=v[5],
            liquid_viscosity_pa_s=v[6],
            vapour_viscosity_pa_s=v[7],
            liquid_conductivity_w_m_k=v[8],
            vapour_conductivity_w_m_k=v[9],
            surface_tension_n_m=v[10] if table.has_surface_tension else None,
        )
