"""Fluidelastic instability: the velocity at which the stream drives a tube of a bank into growing motion."""

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from crossbank_service.methods.criterion import NEAR, WITHIN, Codes, Criterion
from crossbank_service.methods.record import Array, Limit
from crossbank_service.methods.tube_section import (
    INLINE,
    NORMAL_TRIANGLE,
    ROTATED_SQUARE,
    ROTATED_TRIANGLE,
    Law,
)

Patterns = NDArray[np.int64]
Mask = NDArray[np.bool_]

CODE_DAMPING_GAS, CODE_DAMPING_WET = 0.005, 0.015
INSTABILITY_NEAR, INSTABILITY_BEYOND = 0.75, 1.0
LOOSE_CLEARANCE_M = 0.0008
_LEAST_HZ = 1e-3


def mass_damping(*, mass_kg_m: Array, damping_ratio: Array, density_kg_m3: Array, diameter_m: Array) -> Array:
    """Mass-damping X = 2 pi zeta m/(rho D^2) [-]; m with added mass, zeta in the still fluid."""
    return 2.0 * np.pi * damping_ratio * mass_kg_m / (density_kg_m3 * diameter_m**2)


def pettigrew_taylor_constant(pitch_ratio: Array) -> Array:
    """Instability constant K [-] of every layout: 4.76 (P/D - 1) + 0.76 below P/D 1.47, 3.0 above."""
    p = np.maximum(pitch_ratio, 1.0)
    return np.where(p >= 1.47, 3.0, 4.76 * (p - 1.0) + 0.76)


def pettigrew_taylor_2003(
    *, frequency_hz: Array, diameter_m: Array, mass_damping: Array, pitch_ratio: Array, pattern: Patterns
) -> Array:
    """Critical pitch velocity V_c = K f D X^0.5 [m/s] (Pettigrew & Taylor 1991, 2003)."""
    k = pettigrew_taylor_constant(pitch_ratio) + 0.0 * pattern
    return k * frequency_hz * diameter_m * np.sqrt(mass_damping)


def weaver_fitzpatrick_1988(
    *, frequency_hz: Array, diameter_m: Array, mass_damping: Array, pitch_ratio: Array, pattern: Patterns
) -> Array:
    """Critical pitch velocity of 30, 45 and 90 degree banks [m/s]; infinite at 60, where it is not offered.

    Notes
    -----
    V/(f D): 90 degrees 1.4 below X = 0.3, 2.5 X^0.48 above; 45 degrees 2.2 and 4.0 X^0.48; 30 degrees 2.0 and
    3.2 X^0.40 (from memory; the branches join within 2 % at X = 0.3).
    """
    x = mass_damping + 0.0 * pitch_ratio
    low = _choose(pattern, (2.0, 2.2, np.inf, 1.4))
    high = _choose(pattern, (3.2, 4.0, np.inf, 2.5))
    exponent = _choose(pattern, (0.40, 0.48, 0.0, 0.48))
    return np.where(x < 0.3, low, high * np.maximum(x, 0.3) ** exponent) * frequency_hz * diameter_m


def chen_1984(
    *, frequency_hz: Array, diameter_m: Array, mass_damping: Array, pitch_ratio: Array, pattern: Patterns
) -> Array:
    """Critical gap velocity of every layout, lower bounds of the data [m/s].

    Notes
    -----
    V/(f D): 90 degrees 2.10 X^0.15 below X = 0.7, 2.35 X^0.5 above; 45 degrees 3.54 (P/D - 0.5) X^0.5; 30
    degrees 3.58 (P/D - 0.9) X^0.1 below X = 2, 6.53 (P/D - 0.9) X^0.5 above (the jump at 2 is real); 60
    degrees 2.8 X^0.17 below X = 1, 2.8 X^0.5 above (Chen 1984, from memory).
    """
    p, x = np.maximum(pitch_ratio, 1.0), mass_damping
    root = np.sqrt(x)
    curves = (
        np.where(x < 2.0, 3.58 * (p - 0.9) * x**0.1, 6.53 * (p - 0.9) * root),
        3.54 * (p - 0.5) * root,
        2.8 * np.where(x < 1.0, x**0.17, root) + 0.0 * p,
        np.where(x < 0.7, 2.10 * x**0.15, 2.35 * root) + 0.0 * p,
    )
    return _choose(pattern, curves) * frequency_hz * diameter_m


def asme_appendix_n(
    *, frequency_hz: Array, diameter_m: Array, mass_damping: Array, pitch_ratio: Array, pattern: Patterns
) -> Array:
    """Critical pitch velocity V_c = 2.4 f D X^0.5 [m/s] (ASME III, Appendix N, lower bound, from memory).

    Notes
    -----
    The code pairs it with a damping ratio of 0.005 in gas and 0.015 wet; here it is asked with the tube's
    own, which is usually the smaller and then the more cautious. ``CODE_DAMPING_GAS`` and
    ``CODE_DAMPING_WET`` give the code's pair.
    """
    return 2.4 * frequency_hz * diameter_m * np.sqrt(mass_damping + 0.0 * pitch_ratio + 0.0 * pattern)


def connors_1978(
    *, frequency_hz: Array, diameter_m: Array, mass_damping: Array, pitch_ratio: Array, pattern: Patterns
) -> Array:
    """Critical gap velocity of in-line banks, K = 0.37 + 1.76 P/D [m/s]; infinite elsewhere. History."""
    k = np.where(pattern == INLINE, 0.37 + 1.76 * pitch_ratio, np.inf)
    return k * frequency_hz * diameter_m * np.sqrt(mass_damping)


def connors_1970(
    *, frequency_hz: Array, diameter_m: Array, mass_damping: Array, pitch_ratio: Array, pattern: Patterns
) -> Array:
    """Critical gap velocity of one row at P/D 1.42, K = 9.9 [m/s]. History: not cautious in a bank."""
    return 9.9 * frequency_hz * diameter_m * np.sqrt(mass_damping + 0.0 * pitch_ratio + 0.0 * pattern)


@dataclass(frozen=True)
class Instability:
    """Effective over critical velocity [-] by every criterion; 0 where one is not offered for the layout.

    Attributes
    ----------
    ratio : Array
        By the default, Pettigrew & Taylor.
    highest : Array
        By the lowest of the governing curves.
    by_method : dict
        Ratio by slug, those that are history included.
    """

    ratio: Array
    highest: Array
    by_method: dict[str, Array]

    @property
    def grade(self) -> Codes:
        """Default at 0.75 and 1.0; at best near once the lowest governing curve is exceeded (own rule)."""
        above_lowest = np.where(self.highest > INSTABILITY_BEYOND, NEAR, WITHIN).astype(np.int8)
        return np.maximum(FLUIDELASTIC.grade(self.ratio), above_lowest)


def instability(
    *,
    approach_velocity_m_s: Array,
    pitch_velocity_ratio: Array,
    gap_velocity_ratio: Array,
    frequency_hz: Array,
    diameter_m: Array,
    mass_damping: Array,
    pitch_ratio: Array,
    pattern: Patterns,
) -> Instability:
    """Effective over critical velocity by every criterion, each in the velocity it is written in.

    Parameters
    ----------
    approach_velocity_m_s : Array
        Effective approach velocity of the mode [m/s].
    pitch_velocity_ratio, gap_velocity_ratio : Array
        U_p/U_u and U_gap/U_u [-].
    frequency_hz, diameter_m, mass_damping, pitch_ratio : Array
        f [Hz], D or De_f [m], X [-], P/D [-].
    pattern : NDArray of int
        30, 45, 60 or 90.

    Notes
    -----
    Asked with every span's own pinned frequency and velocity in place of a mode's, it gives the bound for
    closely spaced modes in uneven flow (Blevins 2014).
    """
    reference = {"pitch": pitch_velocity_ratio, "gap": gap_velocity_ratio}
    ratios = {}
    for record in LAWS:
        critical = record.function(
            frequency_hz=np.maximum(frequency_hz, _LEAST_HZ),
            diameter_m=diameter_m,
            mass_damping=mass_damping,
            pitch_ratio=pitch_ratio,
            pattern=pattern,
        )
        ratios[record.slug] = approach_velocity_m_s * reference[record.velocity] / critical
    highest = ratios[LAWS[0].slug]
    for record in LAWS[1:]:
        if record.governs:
            highest = np.maximum(highest, ratios[record.slug])
    return Instability(ratio=ratios[LAWS[0].slug], highest=highest, by_method=ratios)


def in_flow_sensitive(*, pattern: Patterns, pitch_ratio: Array) -> Mask:
    """Where instability along the stream, which is not covered, is a known concern: 60 degrees, P/D < 1.5."""
    return np.asarray((pattern == ROTATED_TRIANGLE) & (pitch_ratio < 1.5))


def span_factor(*, ratio: Array, target: float = INSTABILITY_NEAR) -> Array:
    """Factor on all spans that brings a velocity ratio down to the target [-], at most 1.

    Notes
    -----
    f goes with L^-2, so sqrt(target/ratio); the rise of damping with shorter spans is left out, the relief
    by a tensile force too: check the new spans.
    """
    return np.minimum(1.0, np.sqrt(target / np.maximum(ratio, 1e-12)))


def required_frequency(*, ratio: Array, frequency_hz: Array, target: float = INSTABILITY_NEAR) -> Array:
    """Natural frequency that brings a velocity ratio down to the target with damping unchanged [Hz]."""
    return frequency_hz * np.maximum(1.0, ratio / target)


def allowable_velocity(*, ratio: Array, velocity_m_s: Array, target: float = INSTABILITY_NEAR) -> Array:
    """Velocity at which the ratio would be the target [m/s], the profile unchanged."""
    return velocity_m_s * target / np.maximum(ratio, 1e-12)


def _choose(pattern: Patterns, by_pattern: tuple[Array | float, ...]) -> Array:
    """Pick by layout from values given in the order 30, 45, 60, 90."""
    at = (NORMAL_TRIANGLE, ROTATED_SQUARE, ROTATED_TRIANGLE, INLINE)
    return np.select([pattern == angle for angle in at], by_pattern, default=by_pattern[3])


LAWS = (
    Law(
        slug="pettigrew-taylor-2003",
        check="tube-fluidelastic",
        gives="critical velocity",
        unit="m/s",
        function=pettigrew_taylor_2003,
        source="Pettigrew & Taylor, J. Press. Vessel Technol. 113 (1991) 242; "
        "J. Fluids Struct. 18 (2003) 469, 485",
        trust="consistent",
        velocity="pitch",
        limits=(Limit(quantity="pitch_ratio", at_least=1.22),),
        doubt="K = 3.0 lies below about nine tests in ten; the mean is near 4.",
    ),
    Law(
        slug="weaver-fitzpatrick-1988",
        check="tube-fluidelastic",
        gives="critical velocity",
        unit="m/s",
        function=weaver_fitzpatrick_1988,
        source="Weaver & Fitzpatrick, J. Fluids Struct. 2 (1988) 73",
        trust="consistent",
        patterns=(NORMAL_TRIANGLE, ROTATED_SQUARE, INLINE),
        velocity="pitch",
    ),
    Law(
        slug="chen-1984",
        check="tube-fluidelastic",
        gives="critical velocity",
        unit="m/s",
        function=chen_1984,
        source="Chen, J. Sound Vib. 93 (1984) 439",
        trust="consistent",
        velocity="gap",
        limits=(Limit(quantity="mass_damping", at_least=0.1, at_most=300.0),),
        doubt="The pitch of the 45 degree curve may be the transverse one in the original.",
    ),
    Law(
        slug="asme-appendix-n",
        check="tube-fluidelastic",
        gives="critical velocity",
        unit="m/s",
        function=asme_appendix_n,
        source="ASME BPVC III, Appendix N-1331, lower bound",
        trust="memory",
        velocity="pitch",
        doubt="The code pairs the constant with a damping ratio of 0.005 in gas and 0.015 wet.",
    ),
    Law(
        slug="connors-1978",
        check="tube-fluidelastic",
        gives="critical velocity",
        unit="m/s",
        function=connors_1978,
        source="Connors 1978",
        trust="memory",
        governs=False,
        patterns=(INLINE,),
        velocity="gap",
    ),
    Law(
        slug="connors-1970",
        check="tube-fluidelastic",
        gives="critical velocity",
        unit="m/s",
        function=connors_1970,
        source="Connors 1970, one row at P/D 1.42",
        trust="memory",
        governs=False,
        velocity="gap",
        doubt="One row: not cautious in a bank.",
    ),
)


FLUIDELASTIC = Criterion(
    slug="instability-velocity-share",
    check="tube-fluidelastic",
    quantity="effective over critical velocity",
    unit="",
    sense="at-most",
    near=INSTABILITY_NEAR,
    beyond=INSTABILITY_BEYOND,
    source="critical velocity by the named law; 0.75 covers what is not known of damping and frequency",
    trust="own",
    needs=(
        "spans",
        "ends",
        "mass",
        "Young's modulus",
        "diameter",
        "damping or support data",
        "density",
        "velocity",
    ),
    caution="Fluidelastic instability can destroy tubes within hours; the thresholds have scatter, and an "
    "old, worn or fouled support changes the answer.",
)
CRITERIA = (FLUIDELASTIC,)
