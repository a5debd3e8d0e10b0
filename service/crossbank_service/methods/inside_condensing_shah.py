"""Condensation in horizontal and vertical tubes after Shah."""

import numpy as np

from crossbank_service.methods._condensing import (
    GRAVITY,
    LEAST_MASS_FLUX,
    clipped_quality,
    density_difference,
    dimensionless_gas_velocity,
    liquid_only_coefficient,
)
from crossbank_service.methods._numeric import Value
from crossbank_service.methods.record import Array, Limit, Method


def shah_1979(
    *,
    quality: Value,
    mass_flux_kg_m2_s: Value,
    diameter_m: Value,
    liquid_viscosity_pa_s: Value,
    liquid_conductivity_w_m_k: Value,
    liquid_heat_capacity_j_kg_k: Value,
    reduced_pressure: Value,
) -> Array:
    """Local condensing coefficient of shear-controlled flow; a building block, no gravity term.

    Parameters
    ----------
    quality : array
        Vapour mass fraction [-], clipped to 0.01 to 0.99.
    mass_flux_kg_m2_s : array
        Total [kg/(m2 s)].
    diameter_m : array
        Bore [m].
    liquid_viscosity_pa_s : array
        At saturation [Pa s].
    liquid_conductivity_w_m_k : array
        At saturation [W/(m K)].
    liquid_heat_capacity_j_kg_k : array
        At saturation [J/(kg K)].
    reduced_pressure : array
        Pressure over critical pressure [-].

    Returns
    -------
    array
        Heat transfer coefficient [W/(m2 K)].

    Notes
    -----
    h = h_LO [(1 - x)^0.8 + 3.8 x^0.76 (1 - x)^0.04/p_r^0.38] (Shah, Int. J. Heat Mass Transfer 22 (1979)
    547-556). Its data: vapour at 3 to 300 m/s, Re_LO above 350. Far too low where gravity drains the film.
    """
    x = clipped_quality(quality)
    prandtl = np.asarray(liquid_heat_capacity_j_kg_k) * liquid_viscosity_pa_s / liquid_conductivity_w_m_k
    liquid_only = liquid_only_coefficient(
        mass_flux_kg_m2_s, diameter_m, liquid_viscosity_pa_s, prandtl, liquid_conductivity_w_m_k
    )
    pressure = np.maximum(reduced_pressure, 1e-9)
    h: Array = liquid_only * ((1.0 - x) ** 0.8 + 3.8 * x**0.76 * (1.0 - x) ** 0.04 / pressure**0.38)
    return h


def shah_2016(
    *,
    quality: Value,
    mass_flux_kg_m2_s: Value,
    diameter_m: Value,
    liquid_density_kg_m3: Value,
    vapour_density_kg_m3: Value,
    liquid_viscosity_pa_s: Value,
    vapour_viscosity_pa_s: Value,
    liquid_conductivity_w_m_k: Value,
    liquid_heat_capacity_j_kg_k: Value,
    surface_tension_n_m: Value,
    reduced_pressure: Value,
    vertical: Value = 0.0,
) -> Array:
    """Local condensing coefficient in horizontal or vertical (downflow) tubes.

    Parameters
    ----------
    quality : array
        Vapour mass fraction [-], clipped to 0.01 to 0.99.
    mass_flux_kg_m2_s : array
        Total [kg/(m2 s)]; below 1 read as 1.
    diameter_m : array
        Bore [m].
    liquid_density_kg_m3, vapour_density_kg_m3 : array
        At saturation [kg/m3].
    liquid_viscosity_pa_s, vapour_viscosity_pa_s : array
        At saturation [Pa s].
    liquid_conductivity_w_m_k : array
        At saturation [W/(m K)].
    liquid_heat_capacity_j_kg_k : array
        At saturation [J/(kg K)].
    surface_tension_n_m : array
        [N/m].
    reduced_pressure : array
        Pressure over critical pressure [-].
    vertical : array
        True for vertical tubes with downward flow.

    Returns
    -------
    array
        Heat transfer coefficient [W/(m2 K)].

    Notes
    -----
    Z = (1/x - 1)^0.8 p_r^0.4, h_I = h_LS (1 + 3.8/Z^0.95) [m_l/(14 m_g)]^(0.0058 + 0.557 p_r),
    h_N = 1.32 Re_l^(-1/3) [r_l (r_l - r_g) g k^3/m_l^2]^(1/3). Horizontal: III (h_N) if
    J <= 0.95/(1.254 + 2.27 Z^1.249); I (h_I) if We > 100 and J >= 0.98 (Z + 0.263)^-0.62; else II
    (h_I + h_N). Vertical: I if J >= 1/(2.4 Z + 0.73); III if J <= 0.89 - 0.93 exp(-0.087 Z^-1.17); else II
    (Shah, HVAC&R Research 15 (2009) 889-913 and 19 (2013), Int. J. Refrig. 67 (2016) 22-41; as in ASHRAE
    Fundamentals). Jumps at the regimes' edges.
    """
    x = clipped_quality(quality)
    flux = np.maximum(mass_flux_kg_m2_s, LEAST_MASS_FLUX)
    liquid = np.asarray(liquid_density_kg_m3, dtype=np.float64)
    viscosity = np.asarray(liquid_viscosity_pa_s, dtype=np.float64)
    pressure = np.clip(np.asarray(reduced_pressure, dtype=np.float64), 1e-9, 1.0)
    prandtl = liquid_heat_capacity_j_kg_k * viscosity / liquid_conductivity_w_m_k
    z = (1.0 / x - 1.0) ** 0.8 * pressure**0.4
    superficial = liquid_only_coefficient(
        flux * (1.0 - x), diameter_m, viscosity, prandtl, liquid_conductivity_w_m_k
    )
    exponent = 0.0058 + 0.557 * pressure
    sheared = (
        superficial
        * (1.0 + 3.8 / z**0.95)
        * (viscosity / (14.0 * np.asarray(vapour_viscosity_pa_s))) ** exponent
    )
    reynolds = flux * (1.0 - x) * diameter_m / viscosity
    weight = liquid * density_difference(liquid, vapour_density_kg_m3) * GRAVITY
    film = 1.32 * np.cbrt(weight / viscosity**2 / reynolds) * liquid_conductivity_w_m_k

    velocity = dimensionless_gas_velocity(x, flux, diameter_m, liquid, vapour_density_kg_m3)
    weber = flux**2 * diameter_m / (np.asarray(vapour_density_kg_m3) * surface_tension_n_m)
    upright = np.asarray(vertical, dtype=bool)
    shear_edge = np.where(upright, 1.0 / (2.4 * z + 0.73), 0.98 * (z + 0.263) ** -0.62)
    film_edge = np.where(upright, 0.89 - 0.93 * np.exp(-0.087 * z**-1.17), 0.95 / (1.254 + 2.27 * z**1.249))
    regime_1 = (velocity >= shear_edge) & (upright | (weber > 100.0))
    regime_3 = (velocity <= film_edge) & ~(upright & regime_1)
    return np.where(regime_3, film, np.where(regime_1, sheared, sheared + film))


RECORDS = (
    Method(
        slug="shah-2016",
        role="inside_heat_transfer",
        surfaces=("condensing",),
        gives="heat_transfer_coefficient_w_m2_k",
        function=shah_2016,
        inputs=(
            "quality",
            "mass_flux_kg_m2_s",
            "diameter_m",
            "liquid_density_kg_m3",
            "vapour_density_kg_m3",
            "liquid_viscosity_pa_s",
            "vapour_viscosity_pa_s",
            "liquid_conductivity_w_m_k",
            "liquid_heat_capacity_j_kg_k",
            "surface_tension_n_m",
            "reduced_pressure",
        ),
        options=("vertical",),
        limits=(
            Limit(quantity="reduced_pressure", at_least=0.0008, at_most=0.946),
            Limit(quantity="diameter_m", at_least=0.0001, at_most=0.049),
            Limit(quantity="mass_flux_kg_m2_s", at_least=1.1, at_most=1400.0),
        ),
        source=(
            "M. M. Shah, HVAC&R Research 15 (2009) 889-913, 19 (2013) 1038-1056; Int. J. Refrigeration 67 "
            "(2016) 22-41; ASHRAE Handbook of Fundamentals"
        ),
        doubt=(
            "jumps by up to a factor of two where its regimes meet: a second opinion, not for stepping along "
            "a tube; span of the data from memory"
        ),
        note="mass flux below 1 kg/(m2 s) read as 1; quality read between 0.01 and 0.99",
        scatter_fraction=0.17,
        standard_uncertainty_fraction=0.21,
    ),
)
