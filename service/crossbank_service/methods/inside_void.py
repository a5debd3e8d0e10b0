"""Void fraction and momentum flux of two-phase flow in tubes, finite for quality 0 to 1 and flow from 0."""

import numpy as np

from crossbank_service.methods._numeric import Value
from crossbank_service.methods.record import Array

GRAVITY = 9.80665
LEAST_MASS_FLUX = 1e-6
"""Floor of the mass flux [kg/(m2 s)] in groups that would divide by it."""


def homogeneous_void(*, quality: Value, liquid_density_kg_m3: Value, vapour_density_kg_m3: Value) -> Array:
    """Void fraction without slip.

    Parameters
    ----------
    quality : array
        Vapour mass fraction [-], clipped to 0 to 1.
    liquid_density_kg_m3, vapour_density_kg_m3 : array
        [kg/m3].

    Returns
    -------
    array
        Void fraction [-].

    Notes
    -----
    eps = 1/[1 + (1 - x)/x r_g/r_l].
    """
    x = np.clip(np.asarray(quality, dtype=np.float64), 0.0, 1.0)
    void: Array = x / (x + (1.0 - x) * (np.asarray(vapour_density_kg_m3) / liquid_density_kg_m3))
    return void


def zivi_void(*, quality: Value, liquid_density_kg_m3: Value, vapour_density_kg_m3: Value) -> Array:
    """Void fraction of least kinetic energy in annular flow.

    Parameters
    ----------
    quality : array
        Vapour mass fraction [-], clipped to 0 to 1.
    liquid_density_kg_m3, vapour_density_kg_m3 : array
        [kg/m3].

    Returns
    -------
    array
        Void fraction [-].

    Notes
    -----
    eps = 1/[1 + (1 - x)/x (r_g/r_l)^(2/3)] (Zivi, J. Heat Transfer 86 (1964) 247-252).
    """
    x = np.clip(np.asarray(quality, dtype=np.float64), 0.0, 1.0)
    slip = np.cbrt(np.asarray(vapour_density_kg_m3) / liquid_density_kg_m3) ** 2
    void: Array = x / (x + (1.0 - x) * slip)
    return void


def _drift_denominator(
    x: Array, flux: Value, liquid: Value, vapour: Value, surface_tension: Value
) -> tuple[Array, Array]:
    """Specific volume of the mixture and the denominator of the drift-flux void fraction."""
    rho_l = np.asarray(liquid, dtype=np.float64)
    volume: Array = x / vapour + (1.0 - x) / rho_l
    rise = (GRAVITY * np.asarray(surface_tension) * np.maximum(rho_l - vapour, 0.0)) ** 0.25
    drift = 1.18 * (1.0 - x) * rise / (np.maximum(flux, LEAST_MASS_FLUX) * np.sqrt(rho_l))
    denominator: Array = (1.0 + 0.12 * (1.0 - x)) * volume + drift
    return volume, denominator


def rouhani_axelsson_void(
    *,
    quality: Value,
    mass_flux_kg_m2_s: Value,
    liquid_density_kg_m3: Value,
    vapour_density_kg_m3: Value,
    surface_tension_n_m: Value,
) -> Array:
    """Void fraction of the drift-flux model in horizontal tubes.

    Parameters
    ----------
    quality : array
        Vapour mass fraction [-], clipped to 0 to 1.
    mass_flux_kg_m2_s : array
        Total [kg/(m2 s)].
    liquid_density_kg_m3, vapour_density_kg_m3 : array
        [kg/m3].
    surface_tension_n_m : array
        [N/m].

    Returns
    -------
    array
        Void fraction [-].

    Notes
    -----
    eps = (x/r_g) {[1 + 0.12 (1 - x)] [x/r_g + (1 - x)/r_l]
    + 1.18 (1 - x) [g sigma (r_l - r_g)]^(1/4)/(G r_l^(1/2))}^-1
    (Rouhani and Axelsson, Int. J. Heat Mass Transfer 13 (1970) 383-393, in Steiner's form for horizontal
    tubes, VDI Heat Atlas).
    """
    x = np.clip(np.asarray(quality, dtype=np.float64), 0.0, 1.0)
    _, denominator = _drift_denominator(
        x, mass_flux_kg_m2_s, liquid_density_kg_m3, vapour_density_kg_m3, surface_tension_n_m
    )
    void: Array = x / vapour_density_kg_m3 / denominator
    return void


def log_mean_void(
    *,
    quality: Value,
    mass_flux_kg_m2_s: Value,
    liquid_density_kg_m3: Value,
    vapour_density_kg_m3: Value,
    surface_tension_n_m: Value,
) -> Array:
    """Void fraction as the logarithmic mean of the homogeneous and the drift-flux values.

    Parameters
    ----------
    quality : array
        Vapour mass fraction [-], clipped to 0 to 1.
    mass_flux_kg_m2_s : array
        Total [kg/(m2 s)].
    liquid_density_kg_m3, vapour_density_kg_m3 : array
        [kg/m3].
    surface_tension_n_m : array
        [N/m].

    Returns
    -------
    array
        Void fraction [-].

    Notes
    -----
    eps = (e_h - e_ra)/ln(e_h/e_ra) (El Hajal, Thome, Cavallini, Int. J. Heat Mass Transfer 46 (2003)
    3349-3363).
    """
    x = np.clip(np.asarray(quality, dtype=np.float64), 0.0, 1.0)
    volume, denominator = _drift_denominator(
        x, mass_flux_kg_m2_s, liquid_density_kg_m3, vapour_density_kg_m3, surface_tension_n_m
    )
    homogeneous = x / vapour_density_kg_m3 / volume
    # the quality cancels in the ratio of the two void fractions, so the mean holds at both ends
    u = np.maximum(np.log(denominator / volume), 0.0)
    small = u < 1e-8
    mean = np.where(small, 1.0 - 0.5 * u, -np.expm1(-u) / np.where(small, 1.0, u))
    void: Array = homogeneous * mean
    return void


def momentum_flux(
    *,
    quality: Value,
    mass_flux_kg_m2_s: Value,
    void_fraction: Value,
    liquid_density_kg_m3: Value,
    vapour_density_kg_m3: Value,
) -> Array:
    """Momentum flux of separated two-phase flow; its rise along the tube is a pressure drop.

    Parameters
    ----------
    quality : array
        Vapour mass fraction [-], clipped to 0 to 1.
    mass_flux_kg_m2_s : array
        Total [kg/(m2 s)].
    void_fraction : array
        Of the same place [-].
    liquid_density_kg_m3, vapour_density_kg_m3 : array
        [kg/m3].

    Returns
    -------
    array
        G^2 [(1 - x)^2/(r_l (1 - eps)) + x^2/(r_g eps)] [Pa].

    Notes
    -----
    Pressure drop = momentum flux at the outlet less that at the inlet; negative in condensation.
    """
    x = np.clip(np.asarray(quality, dtype=np.float64), 0.0, 1.0)
    eps = np.clip(np.asarray(void_fraction, dtype=np.float64), 0.0, 1.0)
    wet = np.where(eps < 1.0, (1.0 - x) ** 2 / np.where(eps < 1.0, 1.0 - eps, 1.0), 0.0)
    dry = np.where(eps > 0.0, x**2 / np.where(eps > 0.0, eps, 1.0), 0.0)
    flux: Array = np.asarray(mass_flux_kg_m2_s) ** 2 * (
        wet / np.asarray(liquid_density_kg_m3) + dry / vapour_density_kg_m3
    )
    return flux
