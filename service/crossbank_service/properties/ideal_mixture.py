"""Low-density gas mixtures: one implementation for humid air, flue gas and any other mixture.

Sources: Wilke, J. Chem. Phys. 18 (1950) 517 (viscosity); Mason and Saxena, Phys. Fluids 1 (1958) 361
(conductivity, with the factor 1.0 in place of 1.065); ideal-gas density and heat capacity. Against modern
pure-gas values the mixtures' uncertainty is 1-2 % in viscosity, 3-4 % in conductivity (5 % when rich in
steam); the ideal-gas density is within 0.3 % below 3 bar above 320 K.
"""

from collections.abc import Sequence

import numpy as np

from crossbank_service.properties._gas_data import R, Species
from crossbank_service.properties.medium import Array, State

LOWEST_K, HIGHEST_K = 150.0, 2500.0
"""Temperatures beyond these are held for cp and transport, and the enthalpy goes on linearly."""
REFERENCE_K = 273.15
"""The enthalpy of each gas is zero here."""

Portion = tuple[Species, Array]
"""A gas and its mole fraction; the fractions of a mixture add to 1 and broadcast over the temperatures."""


def molar_mass(portions: Sequence[Portion]) -> Array:
    """Molar mass of the mixture [kg/mol]."""
    total = np.zeros(1)
    for species, y in portions:  # in a fixed order: a sum over an array axis may round by its layout
        total = total + y * species.molar_mass_kg_mol
    return total


def state(portions: Sequence[Portion], temperature_k: Array, pressure_pa: Array) -> State:
    """Density, heat capacity, conductivity and viscosity of the mixture.

    Parameters
    ----------
    portions : sequence of (Species, Array)
        Gases and mole fractions [-], broadcasting against ``temperature_k``.
    temperature_k : Array
        [K]; held within 150 to 2500 K.
    pressure_pa : Array
        [Pa], broadcasting against ``temperature_k``.

    Notes
    -----
    mu = sum_i y_i mu_i / sum_j y_j phi_ij,  k = sum_i y_i k_i / sum_j y_j phi_ij, with
    phi_ij = [1 + (mu_i/mu_j)^(1/2) (M_j/M_i)^(1/4)]^2 / [8 (1 + M_i/M_j)]^(1/2).
    """
    t = np.clip(temperature_k, LOWEST_K, HIGHEST_K)
    mass = molar_mass(portions)
    cp = np.zeros_like(t)
    pure: list[tuple[Array, Array]] = []
    for species, y in portions:
        cp = cp + y * species.heat_capacity.over_r(t)
        pure.append(species.transport(t))
    root = [np.sqrt(mu) for mu, _ in pure]
    viscosity, conductivity = np.zeros_like(t), np.zeros_like(t)
    for i, (one, y) in enumerate(portions):
        weight = np.zeros_like(t)
        for j, (other, x) in enumerate(portions):
            ratio = other.molar_mass_kg_mol / one.molar_mass_kg_mol
            if i == j:
                phi = np.ones_like(t)
            else:
                phi = 1.0 + root[i] / root[j] * ratio**0.25
                phi = phi * phi / np.sqrt(8.0 * (1.0 + 1.0 / ratio))
            weight = weight + x * phi
        # a gas that is absent everywhere still has a positive weight, so nothing is divided by zero
        viscosity = viscosity + y * pure[i][0] / weight
        conductivity = conductivity + y * pure[i][1] / weight
    return State(
        density_kg_m3=pressure_pa * mass / (R * t),
        heat_capacity_j_kg_k=cp * R / mass,
        conductivity_w_m_k=conductivity,
        viscosity_pa_s=viscosity,
    )


def enthalpy(portions: Sequence[Portion], temperature_k: Array) -> Array:
    """Specific enthalpy [J/kg], the exact integral of the heat capacity; each gas is zero at 273.15 K.

    Beyond 150 and 2500 K it goes on linearly with the heat capacity there.
    """
    t = np.clip(temperature_k, LOWEST_K, HIGHEST_K)
    reference = np.full((1,), REFERENCE_K)
    total = np.zeros_like(t)
    for species, y in portions:
        heat = species.heat_capacity
        gain = heat.integral_over_r(t) - heat.integral_over_r(reference)
        total = total + y * (gain + heat.over_r(t) * (temperature_k - t))
    return np.asarray(total * R / molar_mass(portions))
