"""Groups that the condensing correlations share; SI units."""

import numpy as np

from crossbank_service.methods._numeric import Value
from crossbank_service.methods.record import Array

GRAVITY = 9.80665
LEAST_DIFFERENCE = 1e-3
"""Floor of the film temperature difference [K]: coefficients that go with dT^-1/4 stay finite."""
LEAST_MASS_FLUX = 1.0
"""Floor of the mass flux [kg/(m2 s)] in correlations that lose their gravity limit at rest."""


def clipped_quality(quality: Value) -> Array:
    """Quality within 0.01 to 0.99, where the correlations are used."""
    x: Array = np.clip(np.asarray(quality, dtype=np.float64), 0.01, 0.99)
    return x


def clipped_difference(difference: Value) -> Array:
    """Film temperature difference of at least 1e-3 K."""
    dt: Array = np.maximum(np.asarray(difference, dtype=np.float64), LEAST_DIFFERENCE)
    return dt


def density_difference(liquid_density: Value, vapour_density: Value) -> Array:
    """Liquid less vapour density, kept above a millionth of the liquid's."""
    liquid = np.asarray(liquid_density, dtype=np.float64)
    difference: Array = np.maximum(liquid - vapour_density, 1e-6 * liquid)
    return difference


def martinelli(x: Value, density_ratio: Value, viscosity_ratio: Value) -> Array:
    """X_tt = [(1 - x)/x]^0.9 (r_g/r_l)^0.5 (m_l/m_g)^0.1; the ratios are liquid over vapour."""
    wet = (1.0 - np.asarray(x)) / x
    parameter: Array = wet**0.9 * np.asarray(density_ratio) ** -0.5 * np.asarray(viscosity_ratio) ** 0.1
    return parameter


def dimensionless_gas_velocity(
    x: Value, mass_flux: Value, diameter: Value, liquid_density: Value, vapour_density: Value
) -> Array:
    """J = x G/[g D r_g (r_l - r_g)]^(1/2) (Wallis)."""
    scale = GRAVITY * np.asarray(diameter) * vapour_density
    velocity: Array = (
        np.asarray(x) * mass_flux / np.sqrt(scale * density_difference(liquid_density, vapour_density))
    )
    return velocity


def liquid_only_coefficient(
    mass_flux: Value, diameter: Value, viscosity: Value, prandtl: Value, conductivity: Value
) -> Array:
    """0.023 Re^0.8 Pr^0.4 k/D (Dittus and Boelter) of liquid at the given mass flux."""
    reynolds = np.asarray(mass_flux, dtype=np.float64) * diameter / viscosity
    h: Array = 0.023 * reynolds**0.8 * np.asarray(prandtl) ** 0.4 * conductivity / diameter
    return h


def film_group(
    *,
    liquid_density: Value,
    vapour_density: Value,
    viscosity: Value,
    conductivity: Value,
    latent_heat: Value,
    difference: Value,
    diameter: Value,
) -> Array:
    """[g r_l (r_l - r_g) k^3 h/(m_l dT D)]^(1/4), Nusselt's film on a length ``diameter``."""
    weight = GRAVITY * np.asarray(liquid_density) * density_difference(liquid_density, vapour_density)
    group: Array = (
        weight * np.asarray(conductivity) ** 3 * latent_heat / (np.asarray(viscosity) * difference * diameter)
    ) ** 0.25
    return group
