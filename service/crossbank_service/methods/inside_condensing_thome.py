"""Condensation in horizontal tubes after Thome, El Hajal and Cavallini: flow-pattern map and film model."""

from dataclasses import dataclass

import numpy as np

from crossbank_service.methods._condensing import (
    GRAVITY,
    LEAST_MASS_FLUX,
    clipped_difference,
    clipped_quality,
    density_difference,
    film_group,
)
from crossbank_service.methods._numeric import Value
from crossbank_service.methods.inside_void import log_mean_void
from crossbank_service.methods.record import Array, Limit, Method

_MAP_QUALITIES = np.linspace(0.3, 0.99, 24)
"""Where the wavy boundary's minimum is first looked for."""
_GOLDEN = 0.5 * (5.0**0.5 - 1.0)


def stratified_angle(*, void_fraction: Value) -> Array:
    """Angle of the upper, dry part of the perimeter in fully stratified flow.

    Parameters
    ----------
    void_fraction : array
        [-].

    Returns
    -------
    array
        Angle [rad], 0 for a full to 2 pi for an empty tube.

    Notes
    -----
    Explicit form of Biberg (Can. J. Chem. Eng. 77 (1999) 1221-1224), within 1e-4 rad of the geometry.
    """
    vapour = np.clip(np.asarray(void_fraction, dtype=np.float64), 0.0, 1.0)
    liquid = 1.0 - vapour
    skew = 1.0 - 2.0 * liquid
    half_wet = (
        np.pi * liquid
        + np.cbrt(1.5 * np.pi) * (skew + np.cbrt(liquid) - np.cbrt(vapour))
        - liquid * vapour * skew * (1.0 + 4.0 * (liquid**2 + vapour**2)) / 200.0
    )
    angle: Array = np.clip(2.0 * np.pi - 2.0 * half_wet, 0.0, 2.0 * np.pi)
    return angle


@dataclass(frozen=True)
class _Flow:
    """What the map needs of a case."""

    mass_flux: Array
    diameter: Array
    liquid_density: Array
    vapour_density: Array
    liquid_viscosity: Array
    surface_tension: Array

    def void(self, x: Array) -> Array:
        """Logarithmic-mean void fraction at quality x."""
        return log_mean_void(
            quality=x,
            mass_flux_kg_m2_s=self.mass_flux,
            liquid_density_kg_m3=self.liquid_density,
            vapour_density_kg_m3=self.vapour_density,
            surface_tension_n_m=self.surface_tension,
        )

    def wavy(self, x: Array, void: Array) -> Array:
        """Mass flux above which flow is annular, as the formula stands."""
        depth = 0.5 * (1.0 - np.cos(np.pi - 0.5 * stratified_angle(void_fraction=void)))
        depth = np.clip(depth, 1e-9, 1.0 - 1e-9)
        vapour_area = 0.25 * np.pi * void
        weber_froude = GRAVITY * self.diameter**2 * self.liquid_density / self.surface_tension
        weight = 16.0 * vapour_area**3 * GRAVITY * self.diameter * self.liquid_density * self.vapour_density
        chord = np.sqrt(1.0 - (2.0 * depth - 1.0) ** 2)
        waves = (np.pi / (5.0 * depth)) ** 2 * weber_froude**-1.023 + 1.0
        crest = 75.0 * np.exp(-((x**2 - 0.97) ** 2) / (x * (1.0 - x)))
        boundary: Array = np.sqrt(weight / (x**2 * np.pi**2 * chord) * waves) + 50.0 - crest
        return boundary

    def quality_of_least_wavy(self) -> Array:
        """Quality at which the wavy boundary is least: nodes first, then golden section."""
        at_nodes = np.stack([self.wavy(node, self.void(node)) for node in _MAP_QUALITIES])
        best = np.argmin(at_nodes, axis=0)
        low = _MAP_QUALITIES[np.maximum(best - 1, 0)]
        high = _MAP_QUALITIES[np.minimum(best + 1, len(_MAP_QUALITIES) - 1)]
        for _ in range(20):
            step = _GOLDEN * (high - low)
            left, right = high - step, low + step
            falls = self.wavy(left, self.void(left)) > self.wavy(right, self.void(right))
            low, high = np.where(falls, left, low), np.where(falls, high, right)
        middle: Array = 0.5 * (low + high)
        return middle

    def wavy_boundary(self, x: Array) -> Array:
        """Mass flux above which flow is annular, level beyond the minimum over quality."""
        held = np.minimum(x, self.quality_of_least_wavy())
        return self.wavy(held, self.void(held))

    def stratified_boundary(self, x: Array, void: Array) -> Array:
        """Mass flux below which flow is fully stratified."""
        liquid_area, vapour_area = 0.25 * np.pi * (1.0 - void), 0.25 * np.pi * void
        lift = density_difference(self.liquid_density, self.vapour_density)
        balance = liquid_area * vapour_area**2 * self.vapour_density * lift * self.liquid_viscosity * GRAVITY
        boundary: Array = np.cbrt(226.3**2 * balance / (x**2 * (1.0 - x) * np.pi**3)) + 20.0 * x
        return boundary


def thome_2003(
    *,
    quality: Value,
    mass_flux_kg_m2_s: Value,
    diameter_m: Value,
    temperature_difference_k: Value,
    liquid_density_kg_m3: Value,
    vapour_density_kg_m3: Value,
    liquid_viscosity_pa_s: Value,
    liquid_conductivity_w_m_k: Value,
    liquid_heat_capacity_j_kg_k: Value,
    latent_heat_j_kg: Value,
    surface_tension_n_m: Value,
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
    liquid_viscosity_pa_s : array
        At saturation [Pa s].
    liquid_conductivity_w_m_k : array
        At saturation [W/(m K)].
    liquid_heat_capacity_j_kg_k : array
        At saturation [J/(kg K)].
    latent_heat_j_kg : array
        [J/kg].
    surface_tension_n_m : array
        [N/m].

    Returns
    -------
    array
        Heat transfer coefficient [W/(m2 K)].

    Notes
    -----
    h = [h_f th + (2 pi - th) h_c]/(2 pi): film h_f = 0.728 [r_l (r_l - r_g) g h_fg k^3/(m_l D dT)]^(1/4) on
    the dry angle th, convection h_c = 0.003 Re_L^0.74 Pr_l^0.5 (k/delta) f_i on the rest. th is 0 in annular
    flow, the stratified angle in stratified flow, and falls with [(G_w - G)/(G_w - G_s)]^(1/2) between.
    Map: El Hajal, Thome, Cavallini, Int. J. Heat Mass Transfer 46 (2003) 3349-3363; model: Thome, El Hajal,
    Cavallini, same volume, 3365-3387 (from memory).
    """
    x = clipped_quality(quality)
    flux, diameter, liquid, vapour, viscosity, tension = np.broadcast_arrays(
        np.maximum(np.asarray(mass_flux_kg_m2_s, dtype=np.float64), LEAST_MASS_FLUX),
        np.asarray(diameter_m, dtype=np.float64),
        np.asarray(liquid_density_kg_m3, dtype=np.float64),
        np.asarray(vapour_density_kg_m3, dtype=np.float64),
        np.asarray(liquid_viscosity_pa_s, dtype=np.float64),
        np.asarray(surface_tension_n_m, dtype=np.float64),
    )
    flow = _Flow(flux, diameter, liquid, vapour, viscosity, tension)
    void = flow.void(x)
    wavy = flow.wavy_boundary(x)
    level = flow.stratified_boundary(x, void)
    span = np.where(wavy > level, wavy - level, 1.0)
    share = np.where(wavy > level, np.clip((wavy - flux) / span, 0.0, 1.0), np.where(flux < level, 1.0, 0.0))
    dry = stratified_angle(void_fraction=void) * np.sqrt(share)

    wet = 2.0 * np.pi - dry
    core = 1.0 - 2.0 * np.pi * (1.0 - void) / np.maximum(wet, 1e-9)
    # a film that would fill its sector is as thick as the radius
    thickness = 0.5 * diameter * (1.0 - np.sqrt(np.maximum(core, 0.0)))
    slip = x * liquid * (1.0 - void) / ((1.0 - x) * vapour * void)
    ripple = np.sqrt(slip) * (density_difference(liquid, vapour) * GRAVITY * thickness**2 / tension) ** 0.25
    roughness = 1.0 + ripple * np.minimum(flux / level, 1.0)
    prandtl = liquid_heat_capacity_j_kg_k * viscosity / liquid_conductivity_w_m_k
    film_reynolds = 4.0 * flux * (1.0 - x) * thickness / ((1.0 - void) * viscosity)
    convection = (
        0.003 * film_reynolds**0.74 * np.sqrt(prandtl) * liquid_conductivity_w_m_k / thickness * roughness
    )
    film = 0.728 * film_group(
        liquid_density=liquid,
        vapour_density=vapour,
        viscosity=viscosity,
        conductivity=liquid_conductivity_w_m_k,
        latent_heat=latent_heat_j_kg,
        difference=clipped_difference(temperature_difference_k),
        diameter=diameter,
    )
    h: Array = (film * dry + wet * convection) / (2.0 * np.pi)
    return h


RECORDS = (
    Method(
        slug="thome-2003",
        role="inside_heat_transfer",
        surfaces=("condensing",),
        gives="heat_transfer_coefficient_w_m2_k",
        function=thome_2003,
        inputs=(
            "quality",
            "mass_flux_kg_m2_s",
            "diameter_m",
            "temperature_difference_k",
            "liquid_density_kg_m3",
            "vapour_density_kg_m3",
            "liquid_viscosity_pa_s",
            "liquid_conductivity_w_m_k",
            "liquid_heat_capacity_j_kg_k",
            "latent_heat_j_kg",
            "surface_tension_n_m",
        ),
        limits=(
            Limit(quantity="mass_flux_kg_m2_s", at_least=16.0, at_most=1532.0),
            Limit(quantity="diameter_m", at_least=0.0031, at_most=0.0214),
        ),
        source=(
            "J. R. Thome, J. El Hajal, A. Cavallini, Int. J. Heat Mass Transfer 46 (2003) 3349-3363 (map), "
            "3365-3387 (model)"
        ),
        doubt="equations and span of the data from memory; its data are refrigerants",
        note=(
            "horizontal tubes; mass flux below 1 kg/(m2 s) read as 1; quality read between 0.01 and 0.99; "
            "logarithmic-mean void fraction"
        ),
        scatter_fraction=0.20,
        standard_uncertainty_fraction=0.18,
    ),
)
