"""Condensation in horizontal tubes after Chato (gravity) and Dobson and Chato (wavy or annular)."""

import numpy as np

from crossbank_service.methods._condensing import (
    GRAVITY,
    LEAST_MASS_FLUX,
    clipped_difference,
    clipped_quality,
    density_difference,
    film_group,
    liquid_only_coefficient,
    martinelli,
)
from crossbank_service.methods._numeric import Value
from crossbank_service.methods.inside_void import zivi_void
from crossbank_service.methods.record import Array, DerivedLimit, Limit, Method


def chato_1962(
    *,
    diameter_m: Value,
    temperature_difference_k: Value,
    liquid_density_kg_m3: Value,
    vapour_density_kg_m3: Value,
    liquid_viscosity_pa_s: Value,
    liquid_conductivity_w_m_k: Value,
    liquid_heat_capacity_j_kg_k: Value,
    latent_heat_j_kg: Value,
) -> Array:
    """Mean condensing coefficient in a horizontal tube drained by gravity, slow vapour.

    Parameters
    ----------
    diameter_m : array
        Bore [m].
    temperature_difference_k : array
        Saturation less inner surface temperature [K], at least 1e-3.
    liquid_density_kg_m3, vapour_density_kg_m3 : array
        At saturation [kg/m3].
    liquid_viscosity_pa_s : array
        At saturation [Pa s].
    liquid_conductivity_w_m_k : array
        At saturation [W/(m K)].
    liquid_heat_capacity_j_kg_k : array
        At saturation [J/(kg K)].
    latent_heat_j_kg : array
        [J/kg].

    Returns
    -------
    array
        Heat transfer coefficient [W/(m2 K)].

    Notes
    -----
    h = 0.555 [g r_l (r_l - r_g) k^3 h'/(m_l dT D)]^(1/4), h' = h_fg + 0.375 c_l dT
    (Chato, ASHRAE J. 4 (2) (1962) 52-60). Vapour Reynolds number at the inlet below 35000.
    """
    difference = clipped_difference(temperature_difference_k)
    heat = latent_heat_j_kg + 0.375 * np.asarray(liquid_heat_capacity_j_kg_k) * difference
    h: Array = 0.555 * film_group(
        liquid_density=liquid_density_kg_m3,
        vapour_density=vapour_density_kg_m3,
        viscosity=liquid_viscosity_pa_s,
        conductivity=liquid_conductivity_w_m_k,
        latent_heat=heat,
        difference=difference,
        diameter=diameter_m,
    )
    return h


def soliman_froude(*, liquid_reynolds: Value, martinelli_parameter: Value, galileo: Value) -> Array:
    """Soliman's Froude number, which tells wavy from annular flow.

    Parameters
    ----------
    liquid_reynolds : array
        G (1 - x) D/m_l [-].
    martinelli_parameter : array
        X_tt [-].
    galileo : array
        g r_l (r_l - r_g) D^3/m_l^2 [-].

    Returns
    -------
    array
        Fr_so [-].

    Notes
    -----
    Fr_so = 0.025 Re_l^1.59 (Re_l <= 1250) or 1.26 Re_l^1.04, times [(1 + 1.09 X_tt^0.039)/X_tt]^1.5
    Ga^-1/2 (Soliman, J. Heat Transfer 104 (1982) 758-764).
    """
    re = np.asarray(liquid_reynolds, dtype=np.float64)
    x_tt = np.asarray(martinelli_parameter, dtype=np.float64)
    flow = np.where(re <= 1250.0, 0.025 * re**1.59, 1.26 * re**1.04)
    froude: Array = flow * ((1.0 + 1.09 * x_tt**0.039) / x_tt) ** 1.5 / np.sqrt(galileo)
    return froude


def dobson_chato_1998(
    *,
    quality: Value,
    mass_flux_kg_m2_s: Value,
    diameter_m: Value,
    temperature_difference_k: Value,
    liquid_density_kg_m3: Value,
    vapour_density_kg_m3: Value,
    liquid_viscosity_pa_s: Value,
    vapour_viscosity_pa_s: Value,
    liquid_conductivity_w_m_k: Value,
    liquid_heat_capacity_j_kg_k: Value,
    latent_heat_j_kg: Value,
) -> Array:
    """Local condensing coefficient in a horizontal smooth tube.

    Parameters
    ----------
    quality : array
        Vapour mass fraction [-], clipped to 0.01 to 0.99.
    mass_flux_kg_m2_s : array
        Total mass flow over the bore's section [kg/(m2 s)]; below 1 read as 1.
    diameter_m : array
        Bore [m].
    temperature_difference_k : array
        Saturation less inner surface temperature [K], at least 1e-3.
    liquid_density_kg_m3, vapour_density_kg_m3 : array
        At saturation [kg/m3].
    liquid_viscosity_pa_s, vapour_viscosity_pa_s : array
        At saturation [Pa s].
    liquid_conductivity_w_m_k : array
        At saturation [W/(m K)].
    liquid_heat_capacity_j_kg_k : array
        At saturation [J/(kg K)].
    latent_heat_j_kg : array
        [J/kg].

    Returns
    -------
    array
        Heat transfer coefficient [W/(m2 K)].

    Notes
    -----
    Annular (G >= 500 or Fr_so > 20): Nu = 0.023 Re_l^0.8 Pr_l^0.4 (1 + 2.22/X_tt^0.89). Wavy:
    Nu = 0.23 (G D/m_g)^0.12/(1 + 1.11 X_tt^0.58) (Ga Pr_l/Ja)^(1/4) + (1 - th/pi) Nu_f,
    Nu_f = 0.0195 Re_l^0.8 Pr_l^0.4 (1.376 + c1/X_tt^c2)^(1/2), th = pi - arccos(2 eps - 1), eps after Zivi;
    Fr_l = G^2/(r_l^2 g D) <= 0.7: c1 = 4.172 + 5.48 Fr_l - 1.564 Fr_l^2, c2 = 1.773 - 0.169 Fr_l, else
    7.242 and 1.655 (Dobson and Chato, J. Heat Transfer 120 (1998) 193-213). Not continuous where the
    regimes meet.
    """
    x = clipped_quality(quality)
    flux = np.maximum(mass_flux_kg_m2_s, LEAST_MASS_FLUX)
    liquid = np.asarray(liquid_density_kg_m3, dtype=np.float64)
    viscosity = np.asarray(liquid_viscosity_pa_s, dtype=np.float64)
    x_tt = martinelli(x, liquid / vapour_density_kg_m3, viscosity / vapour_viscosity_pa_s)
    prandtl = liquid_heat_capacity_j_kg_k * viscosity / liquid_conductivity_w_m_k
    liquid_coefficient = liquid_only_coefficient(
        flux * (1.0 - x), diameter_m, viscosity, prandtl, liquid_conductivity_w_m_k
    )
    annular = liquid_coefficient * (1.0 + 2.22 / x_tt**0.89)

    froude = np.minimum(flux**2 / (liquid**2 * GRAVITY * diameter_m), 0.7)
    slow = froude < 0.7
    c1 = np.where(slow, 4.172 + 5.48 * froude - 1.564 * froude**2, 7.242)
    c2 = np.where(slow, 1.773 - 0.169 * froude, 1.655)
    void = zivi_void(quality=x, liquid_density_kg_m3=liquid, vapour_density_kg_m3=vapour_density_kg_m3)
    # 1 - th/pi = arccos(2 eps - 1)/pi: share of the perimeter under the pool
    pool = np.arccos(np.clip(2.0 * void - 1.0, -1.0, 1.0)) / np.pi
    forced = 0.0195 / 0.023 * liquid_coefficient * np.sqrt(1.376 + c1 / x_tt**c2)
    film = film_group(
        liquid_density=liquid,
        vapour_density=vapour_density_kg_m3,
        viscosity=viscosity,
        conductivity=liquid_conductivity_w_m_k,
        latent_heat=latent_heat_j_kg,
        difference=clipped_difference(temperature_difference_k),
        diameter=diameter_m,
    )
    vapour_reynolds = flux * diameter_m / vapour_viscosity_pa_s
    wavy = 0.23 * vapour_reynolds**0.12 / (1.0 + 1.11 * x_tt**0.58) * film + pool * forced

    galileo = (
        GRAVITY * liquid * density_difference(liquid, vapour_density_kg_m3) * diameter_m**3 / viscosity**2
    )
    regime = soliman_froude(
        liquid_reynolds=flux * (1.0 - x) * diameter_m / viscosity, martinelli_parameter=x_tt, galileo=galileo
    )
    return np.where((flux >= 500.0) | (regime > 20.0), annular, wavy)


def _inlet_vapour_reynolds(
    *,
    diameter_m: Array,
    mass_flux_kg_m2_s: Value = 0.0,
    vapour_viscosity_pa_s: Value = 1.0,
    **_: Array,
) -> Array:
    """All flow as vapour; 0, which no limit refuses, where the flow is not given."""
    reynolds: Array = mass_flux_kg_m2_s * diameter_m / vapour_viscosity_pa_s
    return reynolds


_FILM = (
    "diameter_m",
    "temperature_difference_k",
    "liquid_density_kg_m3",
    "vapour_density_kg_m3",
    "liquid_viscosity_pa_s",
)

RECORDS = (
    Method(
        slug="chato-1962",
        role="inside_heat_transfer",
        surfaces=("condensing",),
        gives="heat_transfer_coefficient_w_m2_k",
        function=chato_1962,
        inputs=(
            *_FILM,
            "liquid_conductivity_w_m_k",
            "liquid_heat_capacity_j_kg_k",
            "latent_heat_j_kg",
        ),
        derived_limits=(
            DerivedLimit(
                name="Reynolds number of the inlet vapour", value=_inlet_vapour_reynolds, at_most=35000.0
            ),
        ),
        source="J. C. Chato, ASHRAE J. 4 (2) (1962) 52-60",
        doubt="no effect of vapour shear: low at high mass flux; the bottom film thickens in long flat tubes",
        note="horizontal tubes, free draining; saturated properties",
        scatter_fraction=0.15,
        standard_uncertainty_fraction=0.12,
    ),
    Method(
        slug="dobson-chato-1998",
        role="inside_heat_transfer",
        surfaces=("condensing",),
        gives="heat_transfer_coefficient_w_m2_k",
        function=dobson_chato_1998,
        inputs=(
            "quality",
            "mass_flux_kg_m2_s",
            *_FILM,
            "vapour_viscosity_pa_s",
            "liquid_conductivity_w_m_k",
            "liquid_heat_capacity_j_kg_k",
            "latent_heat_j_kg",
        ),
        limits=(
            Limit(quantity="mass_flux_kg_m2_s", at_least=25.0, at_most=800.0),
            Limit(quantity="diameter_m", at_least=0.003, at_most=0.0071),
        ),
        source="M. K. Dobson, J. C. Chato, J. Heat Transfer 120 (1998) 193-213",
        doubt=(
            "refrigerant data in tubes of 3 to 7 mm (span from memory): steam coils lie outside; jumps by up "
            "to half where wavy meets annular flow"
        ),
        note="horizontal tubes; mass flux below 1 kg/(m2 s) read as 1; quality read between 0.01 and 0.99",
        scatter_fraction=0.15,
        standard_uncertainty_fraction=0.18,
    ),
)
