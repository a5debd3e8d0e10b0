"""A tube as a vibrating beam: section, running mass, added mass, damping, layout patterns."""

from collections.abc import Callable
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from crossbank_service.methods._layout import is_staggered
from crossbank_service.methods.criterion import TRUST_WORDS, Trust
from crossbank_service.methods.record import Array, Limit

# Nominal layout angles of the field, in degrees between the flow and the side of the tube triangle or square.
NORMAL_TRIANGLE, ROTATED_SQUARE, ROTATED_TRIANGLE, INLINE = 30, 45, 60, 90

# Fraction form; read as 0.05/pi it lowers the critical velocity by 1.77: kept for a what-if.
GAS_DAMPING_COEFFICIENT = 0.05
GAS_DAMPING_COEFFICIENT_CAUTIOUS = 0.05 / np.pi
DAMPING_WITHOUT_SUPPORT_DATA = 0.002
DAMPING_CEILING_GAS = 0.02
DAMPING_FLOOR_LIQUID = 0.006
DAMPING_CEILING_LIQUID = 0.05
HIGHER_BAND_SHARE = 0.7


@dataclass(frozen=True, kw_only=True)
class Law:
    """One published way to compute what a vibration check compares.

    Attributes
    ----------
    slug : str
        Author and year, such as ``pettigrew-taylor-2003``.
    check : str
        The check it serves, such as ``tube-fluidelastic``.
    gives, unit : str
        What it gives, and its unit ('' for a bare number).
    function : callable
        What computes it.
    source, trust, doubt : str
        Where it is from, how far that was checked, what is doubtful.
    governs : bool
        Whether it takes part in the verdict (False: shown beside it only).
    patterns : tuple of int
        Layout angles in degrees it is offered for; empty for all.
    velocity : str
        The velocity it is written in: ``pitch``, ``gap``, ``approach`` or ''.
    limits : tuple of Limit
        Range of the data or of the formula.
    """

    slug: str
    check: str
    gives: str
    unit: str = ""
    function: Callable[..., Array]
    source: str
    trust: Trust
    doubt: str | None = None
    governs: bool = True
    patterns: tuple[int, ...] = ()
    velocity: str = ""
    limits: tuple[Limit, ...] = ()

    @property
    def attribution(self) -> str:
        """Source and trust in one line, as a finding prints it."""
        return f"{self.source} ({TRUST_WORDS[self.trust]})"

    def offered(self, pattern: NDArray[np.int64]) -> NDArray[np.bool_]:
        """Whether the law is offered for each layout."""
        return (
            np.isin(pattern, self.patterns) if self.patterns else np.ones(np.shape(pattern), dtype=np.bool_)
        )


@dataclass(frozen=True)
class Section:
    """Cross-section of bare tubes; all members of one shape."""

    inner_diameter_m: Array
    area_m2: Array
    second_moment_m4: Array
    radius_of_gyration_m: Array


def section(outer_diameter_m: Array, wall_thickness_m: Array) -> Section:
    """Area and second moment of a round tube.

    Parameters
    ----------
    outer_diameter_m, wall_thickness_m : Array
        D, t [m]; a wall thicker than D/2 counts as a solid bar.

    Returns
    -------
    Section
        Di = D - 2t, A = pi/4 (D^2 - Di^2), I = pi/64 (D^4 - Di^4), sqrt(I/A).
    """
    d = outer_diameter_m
    bore = np.maximum(d - 2.0 * wall_thickness_m, 0.0)
    d2, b2 = d * d, bore * bore
    area = 0.25 * np.pi * (d2 - b2)
    return Section(
        inner_diameter_m=bore,
        area_m2=area,
        second_moment_m4=np.pi / 64.0 * (d2 * d2 - b2 * b2),
        radius_of_gyration_m=0.25 * np.sqrt(d2 + b2),
    )


def layout_angle(transverse_pitch_ratio: Array, longitudinal_pitch_ratio: Array, arrangement: Array) -> Array:
    """Half the angle a staggered triangle opens against the flow, atan((a/2)/b) [rad]; in-line pi/2.

    Notes
    -----
    Exactly 30, 45 and 60 degrees for the normal triangle, rotated square and rotated triangle.
    """
    staggered = np.arctan2(0.5 * transverse_pitch_ratio, longitudinal_pitch_ratio)
    return np.where(is_staggered(arrangement), staggered, 0.5 * np.pi)


def layout_pattern(
    transverse_pitch_ratio: Array, longitudinal_pitch_ratio: Array, arrangement: Array
) -> NDArray[np.int64]:
    """Nearest standard layout: 30, 45, 60 (staggered) or 90 (in-line) [degrees].

    Notes
    -----
    Staggered banks between the standard ones go to the nearer angle (bounds 37.5 and 52.5 degrees), a rule of
    this service; every pattern-dependent constant of the vibration checks hangs on it.
    """
    angle = np.degrees(layout_angle(transverse_pitch_ratio, longitudinal_pitch_ratio, arrangement))
    staggered = np.where(
        angle < 37.5, NORMAL_TRIANGLE, np.where(angle < 52.5, ROTATED_SQUARE, ROTATED_TRIANGLE)
    )
    return np.where(is_staggered(arrangement), staggered, INLINE).astype(np.int64)


def smallest_pitch_ratio(
    transverse_pitch_ratio: Array, longitudinal_pitch_ratio: Array, arrangement: Array
) -> Array:
    """Smallest distance between tube axes over the diameter, P/D [-].

    Notes
    -----
    In-line min(a, b); staggered min(a, sqrt((a/2)^2 + b^2), 2b): all three are the pitch of the 60 degree
    triangle, the second that of the rotated square.
    """
    a, b = transverse_pitch_ratio, longitudinal_pitch_ratio
    diagonal = np.sqrt(0.25 * a * a + b * b)
    return np.where(is_staggered(arrangement), np.minimum(np.minimum(a, diagonal), 2.0 * b), np.minimum(a, b))


def added_mass_coefficient(pitch_ratio: Array, pattern: NDArray[np.int64]) -> Array:
    """Mass that moves with a tube among its neighbours over the displaced mass, Cm [-].

    Parameters
    ----------
    pitch_ratio : Array
        P/D [-], smallest distance between tube axes.
    pattern : NDArray of int
        30, 45, 60 or 90.

    Notes
    -----
    Cm = ((De/D)^2 + 1)/((De/D)^2 - 1), De/D = (0.96 + 0.50 P/D) P/D in a triangle, (1.07 + 0.56 P/D) P/D in a
    square (Rogers, Taylor & Pettigrew 1984; Pettigrew & Taylor 2003; from memory). Range P/D 1.2-2.5, tends
    to 1 beyond. Potential flow among rigid neighbours gives 2 % more to 9 % less than this.
    """
    de2 = confinement_ratio(pitch_ratio, pattern) ** 2
    return (de2 + 1.0) / (de2 - 1.0)


def confinement_ratio(pitch_ratio: Array, pattern: NDArray[np.int64]) -> Array:
    """Equivalent diameter of the surrounding tubes over the tube's, De/D [-], held above 1.01."""
    p = np.maximum(pitch_ratio, 1.0)
    triangle = (pattern == NORMAL_TRIANGLE) | (pattern == ROTATED_TRIANGLE)
    return np.maximum(np.where(triangle, (0.96 + 0.50 * p) * p, (1.07 + 0.56 * p) * p), 1.01)


def tube_mass(
    *,
    outer_diameter_m: Array,
    wall_thickness_m: Array,
    tube_density_kg_m3: Array,
    inside_density_kg_m3: Array,
    outside_density_kg_m3: Array,
    added_mass_coefficient: Array,
    fin_mass_kg_m: Array,
) -> Array:
    """Vibrating mass per length, m [kg/m]: metal, contents, fins and added mass.

    Parameters
    ----------
    outer_diameter_m, wall_thickness_m : Array
        D, t [m].
    tube_density_kg_m3, inside_density_kg_m3, outside_density_kg_m3 : Array
        Densities [kg/m3]. Condensing inside: vapour and film; a flooded tube is the heavier case.
    added_mass_coefficient : Array
        Cm [-].
    fin_mass_kg_m : Array
        Mass of the fins per length [kg/m]; fins count as mass without stiffness.

    Notes
    -----
    m = A rho_t + pi/4 Di^2 rho_i + m_fins + Cm rho_o pi/4 D^2.
    """
    s = section(outer_diameter_m, wall_thickness_m)
    contents = 0.25 * np.pi * s.inner_diameter_m**2 * inside_density_kg_m3
    added = added_mass_coefficient * outside_density_kg_m3 * 0.25 * np.pi * outer_diameter_m**2
    return s.area_m2 * tube_density_kg_m3 + contents + fin_mass_kg_m + added


def effective_fin_diameter(
    *, outer_diameter_m: Array, fin_height_m: Array, fin_thickness_m: Array, fin_pitch_m: Array
) -> Array:
    """Diameter of the bare cylinder with the finned tube's frontal area, De_f [m].

    Notes
    -----
    De_f = ((s - t) D + t (D + 2h))/s (Mair, Jones & Palmer 1975). For vibration and shedding it replaces D,
    also in the velocity ratios; the pressure drop uses the real free section.
    """
    t = np.minimum(fin_thickness_m, fin_pitch_m)
    return np.asarray(outer_diameter_m + 2.0 * fin_height_m * t / fin_pitch_m)


def characteristic_span(spans_m: Array) -> Array:
    """Mean of the three longest spans [m], shape (N,), from (N, S) with 0 where a tube has fewer spans."""
    longest = -np.sort(-spans_m, axis=-1)[..., :3]
    total = longest[..., 0]
    for i in range(1, longest.shape[-1]):
        total = total + longest[..., i]
    return np.asarray(total / np.maximum(np.count_nonzero(longest > 0.0, axis=-1), 1))


def support_share(span_count: Array, support_thickness_m: Array, characteristic_span_m: Array) -> Array:
    """Share (N-1)/N sqrt(Ls/lm) [-] of the supports that the friction damping of both fluids goes with."""
    return (span_count - 1.0) / span_count * np.sqrt(support_thickness_m / characteristic_span_m)


def damping_gas(
    *,
    span_count: Array,
    support_thickness_m: Array,
    characteristic_span_m: Array,
    mode: Array,
    coefficient: float = GAS_DAMPING_COEFFICIENT,
) -> Array:
    """Damping ratio of a multi-span tube in gas, zeta [-].

    Parameters
    ----------
    span_count : Array
        N [-].
    support_thickness_m, characteristic_span_m : Array
        Ls, lm [m]; lm the mean of the three longest spans.
    mode : Array
        Number of the mode, 1 the lowest; modes above the first band (mode > N) are given 0.7 of the formula,
        since measured third modes are damped less than first ones (Blevins 1975).
    coefficient : float
        0.05; ``GAS_DAMPING_COEFFICIENT_CAUTIOUS`` for the what-if.

    Notes
    -----
    zeta = 0.05 (N-1)/N sqrt(Ls/lm) (Pettigrew, Goyder, Qiao & Axisa 1986, from memory), held between a floor
    and 0.02. The floor, 0.002 with intermediate supports and 0.001 for one span, is a rule of this service.
    """
    formula = coefficient * support_share(span_count, support_thickness_m, characteristic_span_m)
    formula = np.where(mode > span_count, HIGHER_BAND_SHARE * formula, formula)
    floor = np.where(span_count > 1.0, 0.002, 0.001)
    return np.clip(formula, floor, DAMPING_CEILING_GAS)


def viscous_damping(
    *,
    density_kg_m3: Array,
    kinematic_viscosity_m2_s: Array,
    outer_diameter_m: Array,
    frequency_hz: Array,
    mass_kg_m: Array,
    confinement_ratio: Array,
) -> Array:
    """Damping ratio of the Stokes layers on a tube and its neighbours, zv [-].

    Notes
    -----
    zv = pi/sqrt(8) (rho D^2/m) sqrt(2 nu/(pi f D^2)) (1 + g^3)/(1 - g^2)^2, g = D/De (Rogers, Taylor &
    Pettigrew 1984). f is held above 1e-3 Hz.
    """
    d2 = outer_diameter_m**2
    g = 1.0 / confinement_ratio
    layer = np.sqrt(2.0 * kinematic_viscosity_m2_s / (np.pi * np.maximum(frequency_hz, 1e-3) * d2))
    annulus = (1.0 + g**3) / (1.0 - g * g) ** 2
    return np.asarray(np.pi / np.sqrt(8.0) * density_kg_m3 * d2 / mass_kg_m * layer * annulus)


def damping_liquid(
    *,
    span_count: Array,
    support_thickness_m: Array,
    characteristic_span_m: Array,
    mode: Array,
    density_kg_m3: Array,
    kinematic_viscosity_m2_s: Array,
    outer_diameter_m: Array,
    frequency_hz: Array,
    mass_kg_m: Array,
    confinement_ratio: Array,
) -> Array:
    """Damping ratio of a multi-span tube in liquid, zeta [-].

    Parameters
    ----------
    span_count, support_thickness_m, characteristic_span_m, mode : Array
        N [-], Ls, lm [m], number of the mode [-].
    density_kg_m3, kinematic_viscosity_m2_s : Array
        rho [kg/m3], nu [m2/s] outside.
    outer_diameter_m, frequency_hz, mass_kg_m : Array
        D [m], f [Hz], m [kg/m] with added mass.
    confinement_ratio : Array
        De/D [-].

    Notes
    -----
    zeta = zv + (N-1)/N sqrt(Ls/lm) (14.60/f rho D^2/m + 0.005), between 0.006 and 0.05 (Pettigrew, Rogers &
    Axisa 2011). Modes above the first band keep 0.7 of the part that comes from the supports, as in gas.
    """
    viscous = viscous_damping(
        density_kg_m3=density_kg_m3,
        kinematic_viscosity_m2_s=kinematic_viscosity_m2_s,
        outer_diameter_m=outer_diameter_m,
        frequency_hz=frequency_hz,
        mass_kg_m=mass_kg_m,
        confinement_ratio=confinement_ratio,
    )
    squeeze = 14.60 / np.maximum(frequency_hz, 1e-3) * density_kg_m3 * outer_diameter_m**2 / mass_kg_m
    supports = support_share(span_count, support_thickness_m, characteristic_span_m) * (squeeze + 0.005)
    supports = np.where(mode > span_count, HIGHER_BAND_SHARE * supports, supports)
    return np.clip(viscous + supports, DAMPING_FLOOR_LIQUID, DAMPING_CEILING_LIQUID)
