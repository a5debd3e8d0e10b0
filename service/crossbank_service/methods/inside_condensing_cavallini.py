"""Condensation in horizontal smooth tubes after Cavallini and others: gravity and shear in one form."""

import numpy as np

from crossbank_service.methods._condensing import (
    clipped_difference,
    clipped_quality,
    dimensionless_gas_velocity,
    film_group,
    liquid_only_coefficient,
    martinelli,
)
from crossbank_service.methods._numeric import Value
from crossbank_service.methods.record import Array, DerivedLimit, Limit, Method


def cavallini_transition(*, martinelli_parameter: Value, hydrocarbon: Value = 0.0) -> Array:
    """Dimensionless gas velocity at which the wall difference begins to matter.

    Parameters
    ----------
    martinelli_parameter : array
        X_tt, both phases turbulent [-].
    hydrocarbon : array
        True for hydrocarbons.

    Returns
    -------
    array
        J_T [-].

    Notes
    -----
    J_T = {[7.5/(4.3 X_tt^1.111 + 1)]^-3 + C_T^-3}^(-1/3), C_T = 1.6 for hydrocarbons, else 2.6
    (Cavallini and others 2006, Eq. 2).
    """
    limit = np.where(np.asarray(hydrocarbon, dtype=bool), 1.6, 2.6)
    bound = (4.3 * np.asarray(martinelli_parameter) ** 1.111 + 1.0) / 7.5
    transition: Array = (bound**3 + limit**-3.0) ** (-1.0 / 3.0)
    return transition


def cavallini_2006(
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
    hydrocarbon: Value = 0.0,
) -> Array:
    """Local condensing coefficient in a horizontal smooth tube.

    Parameters
    ----------
    quality : array
        Vapour mass fraction [-], clipped to 0.01 to 0.99.
    mass_flux_kg_m2_s : array
        Total mass flow over the bore's section [kg/(m2 s)]; 0 gives the gravity-drained film.
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
    hydrocarbon : array
        True for hydrocarbons.

    Returns
    -------
    array
        Heat transfer coefficient [W/(m2 K)].

    Notes
    -----
    J > J_T: h = h_A; else h = [h_A (J_T/J)^0.8 - h_S] (J/J_T) + h_S, continuous at J = J_T.
    h_A = h_LO [1 + 1.128 x^0.817 (r_l/r_g)^0.3685 (m_l/m_g)^0.2363 (1 - m_g/m_l)^2.144 Pr_l^-0.1],
    h_S = 0.725 {1 + 0.741 [(1 - x)/x]^0.3321}^-1 [k^3 r_l (r_l - r_g) g h_fg/(m_l D dT)]^(1/4)
    + (1 - x^0.087) h_LO, h_LO = 0.023 Re_LO^0.8 Pr_l^0.4 k/D.
    Cavallini, Del Col, Doretti, Matkovic, Rossetto, Zilio, Censi, Heat Transfer Eng. 27 (8) (2006) 31-38.
    D > 3 mm, p_r < 0.75, r_l/r_g > 4.
    """
    x = clipped_quality(quality)
    density_ratio = np.asarray(liquid_density_kg_m3) / vapour_density_kg_m3
    viscosity_ratio = np.asarray(liquid_viscosity_pa_s) / vapour_viscosity_pa_s
    prandtl = liquid_heat_capacity_j_kg_k * np.asarray(liquid_viscosity_pa_s) / liquid_conductivity_w_m_k
    liquid_only = liquid_only_coefficient(
        mass_flux_kg_m2_s, diameter_m, liquid_viscosity_pa_s, prandtl, liquid_conductivity_w_m_k
    )
    # a vapour more viscous than its liquid does not exist below the critical point; keep the power real
    contrast = np.maximum(1.0 - 1.0 / viscosity_ratio, 0.0)
    sheared = liquid_only * (
        1.0
        + 1.128
        * x**0.8170
        * density_ratio**0.3685
        * viscosity_ratio**0.2363
        * contrast**2.144
        * prandtl**-0.1
    )
    film = film_group(
        liquid_density=liquid_density_kg_m3,
        vapour_density=vapour_density_kg_m3,
        viscosity=liquid_viscosity_pa_s,
        conductivity=liquid_conductivity_w_m_k,
        latent_heat=latent_heat_j_kg,
        difference=clipped_difference(temperature_difference_k),
        diameter=diameter_m,
    )
    stratified = 0.725 * film / (1.0 + 0.741 * ((1.0 - x) / x) ** 0.3321) + (1.0 - x**0.087) * liquid_only
    velocity = dimensionless_gas_velocity(
        x, mass_flux_kg_m2_s, diameter_m, liquid_density_kg_m3, vapour_density_kg_m3
    )
    transition = cavallini_transition(
        martinelli_parameter=martinelli(x, density_ratio, viscosity_ratio), hydrocarbon=hydrocarbon
    )
    # [h_A (J_T/J)^0.8 - h_S] J/J_T + h_S multiplied out, so that it holds at J = 0 too
    share = np.minimum(velocity / transition, 1.0)
    h: Array = sheared * share**0.2 + stratified * (1.0 - share)
    return np.where(share < 1.0, h, sheared)


def _density_ratio(*, liquid_density_kg_m3: Array, vapour_density_kg_m3: Array, **_: Array) -> Array:
    ratio: Array = liquid_density_kg_m3 / vapour_density_kg_m3
    return ratio


RECORDS = (
    Method(
        slug="cavallini-2006",
        role="inside_heat_transfer",
        surfaces=("condensing",),
        gives="heat_transfer_coefficient_w_m2_k",
        function=cavallini_2006,
        inputs=(
            "quality",
            "mass_flux_kg_m2_s",
            "diameter_m",
            "temperature_difference_k",
            "liquid_density_kg_m3",
            "vapour_density_kg_m3",
            "liquid_viscosity_pa_s",
            "vapour_viscosity_pa_s",
            "liquid_conductivity_w_m_k",
            "liquid_heat_capacity_j_kg_k",
            "latent_heat_j_kg",
        ),
        options=("hydrocarbon",),
        limits=(
            Limit(quantity="diameter_m", at_least=0.003),
            Limit(quantity="reduced_pressure", at_most=0.75),
        ),
        derived_limits=(DerivedLimit(name="liquid over vapour density", value=_density_ratio, at_least=4.0),),
        source="A. Cavallini et al., Heat Transfer Eng. 27 (8) (2006) 31-38",
        doubt="its data are mostly refrigerants; steam near atmospheric pressure is at the edge of them",
        note="horizontal tubes; quality read between 0.01 and 0.99; continuous where its two forms meet",
        scatter_fraction=0.15,
        standard_uncertainty_fraction=0.18,
    ),
)
