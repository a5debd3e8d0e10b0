"""Two-phase flow in tubes: frictional gradient, and the front door of void fraction and momentum flux.

All are finite for quality 0 to 1 and mass flux from 0. Friction factors are Darcy's.
"""

import numpy as np

from crossbank_service.methods._numeric import Value, smooth_step
from crossbank_service.methods.inside_void import (
    GRAVITY,
    LEAST_MASS_FLUX,
    homogeneous_void,
    log_mean_void,
    momentum_flux,
    rouhani_axelsson_void,
    zivi_void,
)
from crossbank_service.methods.record import Array, DerivedLimit, Limit, Method

__all__ = [
    "RECORDS",
    "friedel_1979",
    "homogeneous_void",
    "lockhart_martinelli_1949",
    "log_mean_void",
    "momentum_flux",
    "mueller_steinhagen_heck_1986",
    "phase_gradient",
    "rouhani_axelsson_void",
    "zivi_void",
]


def phase_gradient(
    *, mass_flux_kg_m2_s: Value, diameter_m: Value, density_kg_m3: Value, viscosity_pa_s: Value
) -> Array:
    """Frictional gradient of one phase alone in a smooth tube.

    Parameters
    ----------
    mass_flux_kg_m2_s : array
        Of the phase over the whole section [kg/(m2 s)].
    diameter_m : array
        Bore [m].
    density_kg_m3 : array
        [kg/m3].
    viscosity_pa_s : array
        [Pa s].

    Returns
    -------
    array
        Pressure gradient, positive [Pa/m]; 0 at rest.

    Notes
    -----
    f = 64/Re (Hagen) or 0.3164 Re^-0.25 (Blasius), whichever is larger: they meet at Re 1187, where
    Mueller-Steinhagen and Heck change from one to the other.
    """
    flux = np.asarray(mass_flux_kg_m2_s, dtype=np.float64)
    diameter = np.asarray(diameter_m, dtype=np.float64)
    head = 2.0 * np.asarray(density_kg_m3) * diameter
    laminar = 64.0 * np.asarray(viscosity_pa_s) / diameter * flux / head
    turbulent = 0.3164 * (viscosity_pa_s / diameter) ** 0.25 * flux**1.75 / head
    return np.maximum(laminar, turbulent)


def _friedel_gradient(flux: Value, diameter: Value, density: Value, viscosity: Value) -> Array:
    """Gradient of all flow as one phase with Friedel's own friction law."""
    reynolds = np.asarray(flux, dtype=np.float64) * diameter / viscosity
    fast = np.maximum(reynolds, 1055.0)
    turbulent = (0.86859 * np.log(fast / (1.964 * np.log(fast) - 3.8215))) ** -2.0
    # the two meet at 1055 within 0.03 %; below it the turbulent value is held and the laminar is larger
    factor = np.maximum(64.0 / np.maximum(reynolds, 1e-12), turbulent)
    gradient: Array = factor * np.asarray(flux) ** 2 / (2.0 * np.asarray(density) * diameter)
    return gradient


def _martinelli_gradient(
    flux: Value, diameter: Value, density: Value, viscosity: Value
) -> tuple[Array, Array]:
    """Gradient of one phase alone with Lockhart and Martinelli's friction law, and its turbulent share."""
    mass_flux = np.asarray(flux, dtype=np.float64)
    shear = np.asarray(viscosity, dtype=np.float64) / diameter
    head = 2.0 * np.asarray(density) * diameter
    share = smooth_step(mass_flux / shear, 2000.0, 2400.0)
    laminar = 64.0 * shear * mass_flux / head
    turbulent = 0.184 * shear**0.2 * mass_flux**1.8 / head
    gradient: Array = (1.0 - share) * laminar + share * turbulent
    return gradient, share


def mueller_steinhagen_heck_1986(
    *,
    quality: Value,
    mass_flux_kg_m2_s: Value,
    diameter_m: Value,
    liquid_density_kg_m3: Value,
    vapour_density_kg_m3: Value,
    liquid_viscosity_pa_s: Value,
    vapour_viscosity_pa_s: Value,
) -> Array:
    """Frictional gradient of two-phase flow; each phase alone at quality 0 and 1.

    Parameters
    ----------
    quality : array
        Vapour mass fraction [-], clipped to 0 to 1.
    mass_flux_kg_m2_s : array
        Total [kg/(m2 s)].
    diameter_m : array
        Bore [m].
    liquid_density_kg_m3, vapour_density_kg_m3 : array
        [kg/m3].
    liquid_viscosity_pa_s, vapour_viscosity_pa_s : array
        [Pa s].

    Returns
    -------
    array
        Pressure gradient, positive [Pa/m].

    Notes
    -----
    dp/dz = [a + 2 (b - a) x] (1 - x)^(1/3) + b x^3, a and b the gradients of all flow as liquid and as
    vapour (Mueller-Steinhagen and Heck, Chem. Eng. Process. 20 (1986) 297-308), smooth-tube factors. Meant
    for b > a; the bracket is not let below the smaller of the two.
    """
    x = np.clip(np.asarray(quality, dtype=np.float64), 0.0, 1.0)
    a = phase_gradient(
        mass_flux_kg_m2_s=mass_flux_kg_m2_s,
        diameter_m=diameter_m,
        density_kg_m3=liquid_density_kg_m3,
        viscosity_pa_s=liquid_viscosity_pa_s,
    )
    b = phase_gradient(
        mass_flux_kg_m2_s=mass_flux_kg_m2_s,
        diameter_m=diameter_m,
        density_kg_m3=vapour_density_kg_m3,
        viscosity_pa_s=vapour_viscosity_pa_s,
    )
    # the line is meant for b > a; elsewhere (thick vapour) it is kept from passing below either phase
    line = np.maximum(a + 2.0 * (b - a) * x, np.minimum(a, b))
    gradient: Array = line * np.cbrt(1.0 - x) + b * x**3
    return gradient


def friedel_1979(
    *,
    quality: Value,
    mass_flux_kg_m2_s: Value,
    diameter_m: Value,
    liquid_density_kg_m3: Value,
    vapour_density_kg_m3: Value,
    liquid_viscosity_pa_s: Value,
    vapour_viscosity_pa_s: Value,
    surface_tension_n_m: Value,
) -> Array:
    """Frictional gradient of two-phase flow from a multiplier on the liquid.

    Parameters
    ----------
    quality : array
        Vapour mass fraction [-], clipped to 0 to 1.
    mass_flux_kg_m2_s : array
        Total [kg/(m2 s)].
    diameter_m : array
        Bore [m].
    liquid_density_kg_m3, vapour_density_kg_m3 : array
        [kg/m3].
    liquid_viscosity_pa_s, vapour_viscosity_pa_s : array
        [Pa s].
    surface_tension_n_m : array
        [N/m].

    Returns
    -------
    array
        Pressure gradient, positive [Pa/m].

    Notes
    -----
    phi_lo^2 = A + 3.24 F H/(Fr^0.0454 We^0.035), A = (1 - x)^2 + x^2 r_l f_go/(r_g f_lo),
    F = x^0.78 (1 - x)^0.224, H = (r_l/r_g)^0.91 (m_g/m_l)^0.19 (1 - m_g/m_l)^0.7, Fr and We with the
    homogeneous density (Friedel, European Two-Phase Flow Group Meeting, Ispra 1979, paper E2). Friction
    factors as in that paper: 64/Re to Re 1055, above [0.86859 ln(Re/(1.964 ln Re - 3.8215))]^-2. m_l/m_g
    below 1000, G above 100.
    """
    x = np.clip(np.asarray(quality, dtype=np.float64), 0.0, 1.0)
    flux = np.maximum(mass_flux_kg_m2_s, LEAST_MASS_FLUX)
    liquid = np.asarray(liquid_density_kg_m3, dtype=np.float64)
    a = _friedel_gradient(flux, diameter_m, liquid, liquid_viscosity_pa_s)
    b = _friedel_gradient(flux, diameter_m, vapour_density_kg_m3, vapour_viscosity_pa_s)
    homogeneous = 1.0 / (x / vapour_density_kg_m3 + (1.0 - x) / liquid)
    froude = flux**2 / (GRAVITY * diameter_m * homogeneous**2)
    weber = flux**2 * diameter_m / (np.asarray(surface_tension_n_m) * homogeneous)
    viscosity_ratio = np.minimum(np.asarray(vapour_viscosity_pa_s) / liquid_viscosity_pa_s, 1.0)
    h = (liquid / vapour_density_kg_m3) ** 0.91 * viscosity_ratio**0.19 * (1.0 - viscosity_ratio) ** 0.7
    f = x**0.78 * (1.0 - x) ** 0.224
    multiplied = a * (1.0 - x) ** 2 + b * x**2 + a * 3.24 * f * h / (froude**0.0454 * weber**0.035)
    # nothing flows, nothing is lost
    gradient: Array = multiplied * np.minimum(np.asarray(mass_flux_kg_m2_s) / LEAST_MASS_FLUX, 1.0)
    return gradient


def lockhart_martinelli_1949(
    *,
    quality: Value,
    mass_flux_kg_m2_s: Value,
    diameter_m: Value,
    liquid_density_kg_m3: Value,
    vapour_density_kg_m3: Value,
    liquid_viscosity_pa_s: Value,
    vapour_viscosity_pa_s: Value,
) -> Array:
    """Frictional gradient of two-phase flow from the gradients of each phase alone.

    Parameters
    ----------
    quality : array
        Vapour mass fraction [-], clipped to 0 to 1.
    mass_flux_kg_m2_s : array
        Total [kg/(m2 s)].
    diameter_m : array
        Bore [m].
    liquid_density_kg_m3, vapour_density_kg_m3 : array
        [kg/m3].
    liquid_viscosity_pa_s, vapour_viscosity_pa_s : array
        [Pa s].

    Returns
    -------
    array
        Pressure gradient, positive [Pa/m].

    Notes
    -----
    phi_l^2 = 1 + C/X + 1/X^2, written without the division: dp_l + C (dp_l dp_g)^(1/2) + dp_g
    (Lockhart and Martinelli, Chem. Eng. Prog. 45 (1949) 39-48; C of Chisholm, Int. J. Heat Mass Transfer
    10 (1967) 1767-1778: 20 both turbulent, 12 liquid laminar, 10 vapour laminar, 5 both). f = 64/Re or
    0.184 Re^-0.2; a phase turns turbulent at Re 2000, f and C joined smoothly from 2000 to 2400.
    """
    x = np.clip(np.asarray(quality, dtype=np.float64), 0.0, 1.0)
    flux = np.asarray(mass_flux_kg_m2_s, dtype=np.float64)
    liquid, wl = _martinelli_gradient(
        flux * (1.0 - x), diameter_m, liquid_density_kg_m3, liquid_viscosity_pa_s
    )
    vapour, wg = _martinelli_gradient(flux * x, diameter_m, vapour_density_kg_m3, vapour_viscosity_pa_s)
    c = (1.0 - wl) * ((1.0 - wg) * 5.0 + wg * 12.0) + wl * ((1.0 - wg) * 10.0 + wg * 20.0)
    gradient: Array = liquid + c * np.sqrt(liquid) * np.sqrt(vapour) + vapour
    return gradient


def _viscosity_ratio(*, liquid_viscosity_pa_s: Array, vapour_viscosity_pa_s: Array, **_: Array) -> Array:
    ratio: Array = liquid_viscosity_pa_s / vapour_viscosity_pa_s
    return ratio


_INPUTS = (
    "quality",
    "mass_flux_kg_m2_s",
    "diameter_m",
    "liquid_density_kg_m3",
    "vapour_density_kg_m3",
    "liquid_viscosity_pa_s",
    "vapour_viscosity_pa_s",
)

RECORDS = (
    Method(
        slug="mueller-steinhagen-heck-1986",
        role="inside_pressure_drop",
        surfaces=("condensing",),
        gives="pressure_gradient_pa_m",
        function=mueller_steinhagen_heck_1986,
        inputs=_INPUTS,
        source="H. Mueller-Steinhagen, K. Heck, Chem. Eng. Process. 20 (1986) 297-308",
        doubt="smooth tubes; with rough-tube friction factors it is up to 15 % higher",
        note="Hagen and Blasius friction factors, which meet at Re 1187",
        scatter_fraction=0.35,
        standard_uncertainty_fraction=0.20,
    ),
    Method(
        slug="friedel-1979",
        role="inside_pressure_drop",
        surfaces=("condensing",),
        gives="pressure_gradient_pa_m",
        function=friedel_1979,
        inputs=(*_INPUTS, "surface_tension_n_m"),
        limits=(Limit(quantity="mass_flux_kg_m2_s", at_least=100.0),),
        derived_limits=(
            DerivedLimit(name="liquid over vapour viscosity", value=_viscosity_ratio, at_most=1000.0),
        ),
        source="L. Friedel, European Two-Phase Flow Group Meeting, Ispra 1979, paper E2",
        doubt="smooth tubes; horizontal form",
        note="the friction law of the source",
        scatter_fraction=0.35,
        standard_uncertainty_fraction=0.20,
    ),
    Method(
        slug="lockhart-martinelli-1949",
        role="inside_pressure_drop",
        surfaces=("condensing",),
        gives="pressure_gradient_pa_m",
        function=lockhart_martinelli_1949,
        inputs=_INPUTS,
        source=(
            "R. W. Lockhart, R. C. Martinelli, Chem. Eng. Prog. 45 (1949) 39-48; constants D. Chisholm, "
            "Int. J. Heat Mass Transfer 10 (1967) 1767-1778"
        ),
        doubt="30 to 40 % below the other methods for steam at low pressure",
        note="f = 64/Re or 0.184 Re^-0.2; a phase turns turbulent at Re 2000, joined smoothly to 2400",
        scatter_fraction=0.40,
        standard_uncertainty_fraction=0.25,
    ),
)
