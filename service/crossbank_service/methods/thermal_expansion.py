"""Thermal expansion of held tubes: forces between rows and frame, buckling, tie-in temperature, sag."""

from dataclasses import dataclass

import numpy as np

from crossbank_service.methods.criterion import Criterion, Values
from crossbank_service.methods.record import Array


def _over_rows(values: Array) -> Array:
    # added row by row, so that the rounding of a case does not depend on the memory layout of its neighbours
    return np.asarray(np.add.accumulate(values, axis=-1)[..., -1:])


@dataclass(frozen=True, kw_only=True)
class Restraint:
    """What tubes held between two tied plates do to each other and to the frame.

    Attributes
    ----------
    strain : Array
        Common strain of tubes and frame, case axis first, one trailing place.
    tube_force_n : Array
        Axial force of one tube of each row, tension positive [N].
    frame_force_n : Array
        Force in the frame, tension positive [N], shape of ``strain``.
    """

    strain: Array
    tube_force_n: Array
    frame_force_n: Array


def held_rigid_force_n(
    elastic_modulus_pa: Values, area_m2: Values, expansion_per_k: Values, rise_k: Values
) -> Array:
    """Axial force of a tube held between plates that do not move.

    Parameters
    ----------
    elastic_modulus_pa : array_like
        Young's modulus at the mean metal temperature [Pa].
    area_m2 : array_like
        Metal section of the tube [m2].
    expansion_per_k : array_like
        Mean expansion from tie-in to metal temperature [1/K].
    rise_k : array_like
        Mean metal less tie-in temperature difference [K].

    Returns
    -------
    Array
        Force, tension positive [N].

    Notes
    -----
    N = -E A alpha dT.
    """
    return np.asarray(
        -np.asarray(elastic_modulus_pa, dtype=np.float64)
        * area_m2
        * np.asarray(expansion_per_k)
        * np.asarray(rise_k)
    )


def framed_forces(
    tubes: Values,
    elastic_modulus_pa: Values,
    area_m2: Values,
    expansion_per_k: Values,
    rise_k: Values,
    *,
    frame_stiffness_n: Values = 0.0,
    frame_expansion_per_k: Values = 0.0,
    frame_rise_k: Values = 0.0,
) -> Restraint:
    """Solve the forces of tubes in rows of unlike temperature between plates tied by a frame.

    Parameters
    ----------
    tubes : array_like
        Tubes of each row, rows on the last axis.
    elastic_modulus_pa, area_m2, expansion_per_k, rise_k : array_like
        Of one tube of each row: Young's modulus [Pa], metal section [m2], mean expansion [1/K], rise of the
        metal over the tie-in temperature [K]; broadcast to (cases, rows).
    frame_stiffness_n : array_like
        E A of the frame, the duct walls that tie the plates [N]; 0 where the plates hang in the tubes
        alone. Shape of the cases with one trailing place, (cases, 1), or a number.
    frame_expansion_per_k, frame_rise_k : array_like
        Of the frame [1/K], [K]; same shape.

    Returns
    -------
    Restraint
        Strain and forces.

    Notes
    -----
    Common strain e = (sum n E A a dT + (E A a dT)_f)/(sum n E A + (E A)_f), N = E A (e - a dT). Plates stay
    parallel and stiff; so rows act against the mean of the bank, and the hottest row is in compression.
    """
    count, modulus, area, alpha, rise = np.broadcast_arrays(
        *(
            np.atleast_1d(np.asarray(x, dtype=np.float64))
            for x in (tubes, elastic_modulus_pa, area_m2, expansion_per_k, rise_k)
        )
    )
    frame = np.asarray(frame_stiffness_n, dtype=np.float64)
    free_frame = np.asarray(np.asarray(frame_expansion_per_k, dtype=np.float64) * frame_rise_k)
    stiffness, free = modulus * area, alpha * rise
    total = _over_rows(count * stiffness) + frame
    push = _over_rows(count * stiffness * free) + frame * free_frame
    strain = np.asarray(np.where(total > 0.0, push / np.where(total > 0.0, total, 1.0), 0.0))
    return Restraint(
        strain=strain,
        tube_force_n=np.asarray(stiffness * (strain - free)),
        frame_force_n=np.asarray(frame * (strain - free_frame)),
    )


def pressure_end_force_n(pressure_pa: Values, inner_diameter_m: Values) -> Array:
    """Pull of the internal pressure on a tube whose ends are capped and free to move.

    Parameters
    ----------
    pressure_pa : array_like
        Internal pressure, gauge [Pa].
    inner_diameter_m : array_like
        Bore [m].

    Returns
    -------
    Array
        Tension [N].

    Notes
    -----
    pi/4 Di^2 p.
    """
    return np.asarray(0.25 * np.pi * np.asarray(inner_diameter_m, dtype=np.float64) ** 2 * pressure_pa)


def euler_load_n(
    bending_stiffness_n_m2: Values, length_m: Values, effective_length_factor: Values = 1.0
) -> Array:
    """Elastic buckling load of a span.

    Parameters
    ----------
    bending_stiffness_n_m2 : array_like
        E I [N m2].
    length_m : array_like
        Longest span [m].
    effective_length_factor : array_like
        1 pinned, 0.5 built in, 0.7 an inner span of a row of supports.

    Returns
    -------
    Array
        Load [N].

    Notes
    -----
    Euler: pi^2 E I/(K L)^2.
    """
    effective = np.maximum(np.asarray(length_m, dtype=np.float64) * effective_length_factor, 1e-9)
    return np.asarray(np.pi**2 * np.asarray(bending_stiffness_n_m2) / effective**2)


def buckling_stress_pa(slenderness: Values, elastic_modulus_pa: Values, yield_stress_pa: Values) -> Array:
    """Compressive stress at which a tube of any slenderness buckles.

    Parameters
    ----------
    slenderness : array_like
        Effective length over radius of gyration, K L/r.
    elastic_modulus_pa, yield_stress_pa : array_like
        Young's modulus and yield stress at the metal temperature [Pa].

    Returns
    -------
    Array
        Stress [Pa].

    Notes
    -----
    Euler above lc = sqrt(2 pi^2 E/sy), J. B. Johnson's parabola sy (1 - l^2/(2 lc^2)) below; they meet at
    sy/2.
    """
    modulus, strength = (
        np.asarray(elastic_modulus_pa, dtype=np.float64),
        np.asarray(yield_stress_pa, dtype=np.float64),
    )
    slender = np.maximum(np.asarray(slenderness, dtype=np.float64), 1e-9)
    limit_squared = 2.0 * np.pi**2 * modulus / strength
    stocky = strength * (1.0 - slender**2 / (2.0 * limit_squared))
    return np.where(slender**2 > limit_squared, np.pi**2 * modulus / slender**2, stocky)


def compression_ratio(force_n: Values, buckling_load_n: Values) -> Array:
    """Compressive force over the buckling load.

    Parameters
    ----------
    force_n : array_like
        Axial force, tension positive [N].
    buckling_load_n : array_like
        Buckling load, positive [N].

    Returns
    -------
    Array
        Ratio, 0 in tension.
    """
    return np.asarray(
        np.maximum(-np.asarray(force_n, dtype=np.float64), 0.0) / np.maximum(buckling_load_n, 1e-9)
    )


def frequency_factor(force_n: Values, euler_load: Values) -> Array:
    """Natural frequency under axial force over that without.

    Parameters
    ----------
    force_n : array_like
        Axial force, tension positive [N].
    euler_load : array_like
        Euler load of the same span [N].

    Returns
    -------
    Array
        Factor; 0 at and beyond buckling.

    Notes
    -----
    sqrt(1 + N/Ncr), exact for pinned ends.
    """
    loading = np.asarray(force_n, dtype=np.float64) / np.maximum(euler_load, 1e-9)
    return np.asarray(np.sqrt(np.maximum(1.0 + loading, 0.0)))


def tie_in_temperature_k(
    force_n: Values,
    wanted_force_n: Values,
    tie_in_temperature_now_k: Values,
    elastic_modulus_pa: Values,
    area_m2: Values,
    expansion_per_k: Values,
) -> Array:
    """Tie-in temperature that brings the force of a rigidly held tube to a wanted value: the remedy.

    Parameters
    ----------
    force_n, wanted_force_n : array_like
        Force now and force wanted, tension positive [N].
    tie_in_temperature_now_k : array_like
        Temperature at which the tube was fixed [K].
    elastic_modulus_pa, area_m2, expansion_per_k : array_like
        Young's modulus [Pa], metal section [m2], mean expansion [1/K].

    Returns
    -------
    Array
        Tie-in temperature [K].

    Notes
    -----
    N rises by E A alpha for each kelvin the tie-in is warmer. Between tubes and a frame of one expansion a
    warmer tie-in changes nothing: then let one end move, or bring the temperatures together.
    """
    per_kelvin = np.asarray(elastic_modulus_pa, dtype=np.float64) * area_m2 * np.asarray(expansion_per_k)
    return np.asarray(
        tie_in_temperature_now_k + (np.asarray(wanted_force_n) - force_n) / np.maximum(per_kelvin, 1e-9)
    )


def longest_span_m(
    force_n: Values,
    bending_stiffness_n_m2: Values,
    effective_length_factor: Values = 1.0,
    ratio: float = 0.5,
    longest_m: float = 100.0,
) -> Array:
    """Longest span that keeps a force to a share of the Euler load: the remedy of closer supports.

    Parameters
    ----------
    force_n : array_like
        Axial force, tension positive [N].
    bending_stiffness_n_m2 : array_like
        E I [N m2].
    effective_length_factor : array_like
        1 pinned, 0.5 built in.
    ratio : float
        Wanted ratio of force to Euler load.
    longest_m : float
        Given where the tube is in tension and any span will do [m].

    Returns
    -------
    Array
        Span [m].
    """
    push = np.maximum(-np.asarray(force_n, dtype=np.float64), 1e-12)
    span = (
        np.pi
        * np.sqrt(ratio * np.asarray(bending_stiffness_n_m2) / push)
        / np.asarray(effective_length_factor)
    )
    return np.asarray(np.minimum(span, longest_m))


def free_expansion_m(length_m: Values, expansion_per_k: Values, rise_k: Values) -> Array:
    """Growth of a tube that is free at one end: the room to leave.

    Parameters
    ----------
    length_m : array_like
        Length between fixed end and free end [m].
    expansion_per_k : array_like
        Mean expansion [1/K].
    rise_k : array_like
        Metal less erection temperature difference [K].

    Returns
    -------
    Array
        Growth [m].
    """
    return np.asarray(np.asarray(length_m, dtype=np.float64) * expansion_per_k * np.asarray(rise_k))


def sag_m(weight_n_m: Values, span_m: Values, bending_stiffness_n_m2: Values, *, built_in: bool) -> Array:
    """Sag of a span under its own weight.

    Parameters
    ----------
    weight_n_m : array_like
        Weight per length, contents and fins included [N/m].
    span_m : array_like
        Span [m].
    bending_stiffness_n_m2 : array_like
        E I [N m2].
    built_in : bool
        True for ends that cannot turn, false for pinned ends.

    Returns
    -------
    Array
        Sag at midspan [m].

    Notes
    -----
    5 w L^4/(384 E I) pinned, w L^4/(384 E I) built in.
    """
    factor = 1.0 if built_in else 5.0
    return np.asarray(
        factor
        * np.asarray(weight_n_m, dtype=np.float64)
        * np.asarray(span_m) ** 4
        / (384.0 * np.asarray(bending_stiffness_n_m2))
    )


def sag_slope(weight_n_m: Values, span_m: Values, bending_stiffness_n_m2: Values, *, built_in: bool) -> Array:
    """Greatest slope of a sagging span: a tube drains only where it is pitched more steeply.

    Parameters
    ----------
    weight_n_m : array_like
        Weight per length, contents and fins included [N/m].
    span_m : array_like
        Span [m].
    bending_stiffness_n_m2 : array_like
        E I [N m2].
    built_in : bool
        True for ends that cannot turn, false for pinned ends.

    Returns
    -------
    Array
        Slope [m/m].

    Notes
    -----
    w L^3/(24 E I) at a pinned end; w L^3/(72 sqrt(3) E I) at 0.211 L from a built-in end.
    """
    divisor = 72.0 * np.sqrt(3.0) if built_in else 24.0
    return np.asarray(
        np.asarray(weight_n_m, dtype=np.float64)
        * np.asarray(span_m) ** 3
        / (divisor * np.asarray(bending_stiffness_n_m2))
    )


_CAUTION = (
    "Row temperatures at start, stop and turn-down may differ more than in any state given; fatigue under "
    "frequent starts (more than about 1000) is not covered."
)

BUCKLING = Criterion(
    slug="buckling-share",
    check="thermal-expansion",
    quantity="compressive force over buckling load",
    unit="",
    sense="at-most",
    beyond=0.8,
    near=0.5,
    source="Euler and Johnson loads; the shares are this service's rule",
    trust="own",
    needs=("end fixity", "metal temperatures", "tie-in temperature", "frame"),
    caution=_CAUTION,
)
STRESS = Criterion(
    slug="stress-share",
    check="thermal-expansion",
    quantity="axial stress over allowable stress",
    unit="",
    sense="at-most",
    beyond=1.0,
    near=0.67,
    source="the shares are this service's rule",
    trust="own",
    needs=("allowable stress", "end fixity", "metal temperatures", "frame"),
    caution=_CAUTION,
)
SAG = Criterion(
    slug="span-sag",
    check="thermal-expansion",
    quantity="sag over span",
    unit="",
    sense="at-most",
    beyond=1.0 / 500.0,
    near=1.0 / 500.0,
    source="span over 500, and less than a third of the vertical gap",
    trust="practice",
    needs=("spans", "Young's modulus", "mass"),
)
CRITERIA = (BUCKLING, STRESS, SAG)
