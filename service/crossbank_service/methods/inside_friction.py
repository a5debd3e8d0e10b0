"""Friction and local losses of single-phase flow in tubes.

Friction factors are Darcy's and finite down to Reynolds number 0.
"""

import numpy as np

from crossbank_service.methods._numeric import Value, smooth_step
from crossbank_service.methods.record import Array, Limit, Method

LAMINAR_END = 2300.0
TURBULENT_START = 4000.0
LEAST_REYNOLDS = 1e-6
"""Floor of the Reynolds number in friction factors: f Re stays finite and f finite at rest."""

ENTRY_LOSS = 0.5
"""Velocity heads lost at a sharp-edged entry from a header (common practice)."""
EXIT_LOSS = 1.0
"""Velocity heads lost at the exit into a header (common practice)."""


def friction_wall_factor(*, reynolds: Value, viscosity_ratio: Value) -> Array:
    """Factor on the friction factor of liquids whose viscosity changes towards the wall.

    Parameters
    ----------
    reynolds : array
        On the bore [-].
    viscosity_ratio : array
        Viscosity at the wall over viscosity of the bulk [-]; below 1 for a heated liquid.

    Returns
    -------
    array
        Factor [-], 1 at ``viscosity_ratio`` 1.

    Notes
    -----
    Turbulent: heated (7 - mu/mu_w)/6, cooled (mu_w/mu)^0.24, for 0.35 < mu_w/mu < 2 (Petukhov, Adv. Heat
    Transfer 6 (1970) 503-564); laminar: heated (mu_w/mu)^0.58, cooled (mu_w/mu)^0.50 (Deissler 1951, as in
    Kays and Crawford). Exponents from memory. Below 0.35 the turbulent factor keeps its value there. The
    two are joined smoothly in ln Re from 2300 to 4000.
    """
    ratio = np.asarray(viscosity_ratio, dtype=np.float64)
    heated = ratio < 1.0
    turbulent = np.where(heated, (7.0 - 1.0 / np.clip(ratio, 0.35, 1.0)) / 6.0, ratio**0.24)
    laminar = np.where(heated, ratio**0.58, ratio**0.50)
    log_re = np.log(np.maximum(reynolds, LEAST_REYNOLDS))
    weight = smooth_step(log_re, float(np.log(LAMINAR_END)), float(np.log(TURBULENT_START)))
    factor: Array = (1.0 - weight) * laminar + weight * turbulent
    return factor


def churchill_1977(
    *, reynolds: Value, relative_roughness: Value, viscosity_ratio: Value = 1.0, gas: Value = 0.0
) -> Array:
    """Darcy friction factor in tubes, any Reynolds number and roughness.

    Parameters
    ----------
    reynolds : array
        On the bore, bulk viscosity [-]; values below 1e-6 are read as 1e-6.
    relative_roughness : array
        Roughness over bore [-].
    viscosity_ratio : array
        Liquids: viscosity at the wall over viscosity of the bulk [-].
    gas : array
        True for gases, which take no wall factor.

    Returns
    -------
    array
        Darcy friction factor [-].

    Notes
    -----
    f = 8 [(8/Re)^12 + (A + B)^-1.5]^(1/12), A = [2.457 ln(1/((7/Re)^0.9 + 0.27 e/D))]^16,
    B = (37530/Re)^16 (Churchill, Chem. Eng. 84 (24) (1977) 91-92), times ``friction_wall_factor``.
    """
    re = np.maximum(reynolds, LEAST_REYNOLDS)
    rough = np.asarray(relative_roughness, dtype=np.float64)
    a = (2.457 * np.log(1.0 / ((7.0 / re) ** 0.9 + 0.27 * rough))) ** 16
    b = (37530.0 / re) ** 16
    f = 8.0 * ((8.0 / re) ** 12 + (a + b) ** -1.5) ** (1.0 / 12.0)
    wall = friction_wall_factor(reynolds=re, viscosity_ratio=viscosity_ratio)
    result: Array = f * np.where(np.asarray(gas, dtype=bool), 1.0, wall)
    return result


def haaland_1983(*, reynolds: Value, relative_roughness: Value) -> Array:
    """Darcy friction factor in turbulent flow, explicit.

    Parameters
    ----------
    reynolds : array
        On the bore [-]; values below 2300 are read as 2300.
    relative_roughness : array
        Roughness over bore [-].

    Returns
    -------
    array
        Darcy friction factor [-].

    Notes
    -----
    f = (-1.8 log10[(e/(3.7 D))^1.11 + 6.9/Re])^-2 (Haaland, J. Fluids Eng. 105 (1983) 89-90).
    """
    re = np.maximum(reynolds, LAMINAR_END)
    rough = (np.asarray(relative_roughness, dtype=np.float64) / 3.7) ** 1.11
    f: Array = (-1.8 * np.log10(rough + 6.9 / re)) ** -2.0
    return f


def colebrook_1939(*, reynolds: Value, relative_roughness: Value) -> Array:
    """Darcy friction factor in turbulent flow, implicit law solved to rounding.

    Parameters
    ----------
    reynolds : array
        On the bore [-]; values below 2300 are read as 2300.
    relative_roughness : array
        Roughness over bore [-].

    Returns
    -------
    array
        Darcy friction factor [-].

    Notes
    -----
    1/f^(1/2) = -2 log10(e/(3.7 D) + 2.51/(Re f^(1/2))) (Colebrook, J. Inst. Civ. Eng. 11 (1939) 133-156).
    Four Newton steps from Haaland's value.
    """
    re = np.maximum(reynolds, LAMINAR_END)
    rough = np.asarray(relative_roughness, dtype=np.float64) / 3.7
    x = haaland_1983(reynolds=re, relative_roughness=relative_roughness) ** -0.5
    scale = 2.0 / np.log(10.0)
    for _ in range(4):
        inner = rough + 2.51 * x / re
        x = x - (x + scale * np.log(inner)) / (1.0 + scale * 2.51 / (re * inner))
    f: Array = x**-2.0
    return f


def friction_gradient(
    *, friction_factor: Value, mass_flux_kg_m2_s: Value, diameter_m: Value, density_kg_m3: Value
) -> Array:
    """Frictional pressure gradient of single-phase flow.

    Parameters
    ----------
    friction_factor : array
        Darcy [-].
    mass_flux_kg_m2_s : array
        [kg/(m2 s)].
    diameter_m : array
        Bore [m].
    density_kg_m3 : array
        [kg/m3].

    Returns
    -------
    array
        Pressure gradient, positive [Pa/m].

    Notes
    -----
    dp/dz = f G^2/(2 rho D).
    """
    flux = np.asarray(mass_flux_kg_m2_s, dtype=np.float64)
    gradient: Array = friction_factor * flux**2 / (2.0 * np.asarray(density_kg_m3) * diameter_m)
    return gradient


def fully_rough_friction_factor(*, relative_roughness: Value) -> Array:
    """Darcy friction factor of fully rough flow, the scale of bend and fitting losses.

    Parameters
    ----------
    relative_roughness : array
        Roughness over bore [-]; values below 1e-6 are read as 1e-6.

    Returns
    -------
    array
        f_T [-].

    Notes
    -----
    f_T = [2 log10(3.7 D/e)]^-2 (Crane, Technical Paper 410; from memory).
    """
    rough = np.maximum(relative_roughness, 1e-6)
    f: Array = (2.0 * np.log10(3.7 / rough)) ** -2.0
    return f


def return_bend_loss(*, relative_roughness: Value, close_pattern: bool = True) -> Array:
    """Velocity heads lost in a return bend of 180 degrees.

    Parameters
    ----------
    relative_roughness : array
        Roughness over bore [-].
    close_pattern : bool
        True: close-pattern return bend, 50 f_T; false: bend of radius 1.5 diameters, 22 f_T.

    Returns
    -------
    array
        Loss coefficient [-].

    Notes
    -----
    Crane, Technical Paper 410 (from memory).
    """
    return (50.0 if close_pattern else 22.0) * fully_rough_friction_factor(
        relative_roughness=relative_roughness
    )


RECORDS = (
    Method(
        slug="churchill-1977",
        role="inside_pressure_drop",
        surfaces=("single-phase",),
        gives="friction_factor",
        function=churchill_1977,
        inputs=("reynolds", "relative_roughness"),
        options=("viscosity_ratio", "gas"),
        limits=(
            Limit(quantity="reynolds", at_most=1e8),
            Limit(quantity="relative_roughness", at_most=0.05),
        ),
        source=(
            "S. W. Churchill, Chem. Eng. 84 (24) (1977) 91-92; wall factor of liquids: Petukhov 1970 "
            "(turbulent), Deissler 1951 (laminar)"
        ),
        doubt="wall factors from memory; the roughness of tubes in service is seldom known",
        note="Darcy factor; the wall factor joins its laminar and turbulent forms from Re 2300 to 4000",
        scatter_fraction=0.05,
        standard_uncertainty_fraction=0.05,
    ),
)
