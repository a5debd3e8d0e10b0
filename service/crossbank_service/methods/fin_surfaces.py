"""Surfaces and free sections of finned tubes per metre of tube: what the finned methods and the banks share.

Everything is a pure function on float64 arrays that broadcast together; ``arrangement`` is 1 (true) for
staggered and 0 (false) for in-line. Impossible geometry (fins thicker than their pitch, overlapping tubes)
gives finite numbers here; saying that it is impossible is the banks' business.
"""

import numpy as np

from crossbank_service.methods.record import Array

# A gap never falls below this share of the pitch it belongs to, so that powers of a gap stay finite.
_LEAST_SHARE = 1e-6


def fin_gap(*, fin_pitch_m: Array, fin_thickness_m: Array) -> Array:
    """Clear gap between two neighbouring fins.

    Parameters
    ----------
    fin_pitch_m, fin_thickness_m : Array
        Fin pitch and thickness [m].

    Returns
    -------
    Array
        s = pitch - thickness [m], at least a millionth of the pitch.
    """
    return np.maximum(fin_pitch_m - fin_thickness_m, _LEAST_SHARE * fin_pitch_m)


def prime_area(*, diameter_m: Array, fin_thickness_m: Array, fin_pitch_m: Array) -> Array:
    """Tube surface left between the fins, per metre of tube.

    Parameters
    ----------
    diameter_m : Array
        Root diameter d [m].
    fin_thickness_m, fin_pitch_m : Array
        Fin thickness and pitch [m].

    Returns
    -------
    Array
        pi d s / pitch [m2/m].
    """
    share = fin_gap(fin_pitch_m=fin_pitch_m, fin_thickness_m=fin_thickness_m) / fin_pitch_m
    return np.pi * diameter_m * share


def annular_fin_area(
    *, diameter_m: Array, fin_height_m: Array, fin_thickness_m: Array, fin_pitch_m: Array
) -> Array:
    """Both faces and the tip edge of annular fins, per metre of tube.

    Parameters
    ----------
    diameter_m : Array
        Root diameter d [m].
    fin_height_m, fin_thickness_m, fin_pitch_m : Array
        Fin height, thickness and pitch [m].

    Returns
    -------
    Array
        [pi/2 (d_f^2 - d^2) + pi d_f t] / pitch, d_f = d + 2 h [m2/m]. At height 0 the edge takes the place
        of the tube surface the fin covers, so the sum with the prime area is the plain tube's.
    """
    tip = diameter_m + 2.0 * fin_height_m
    faces = 2.0 * np.pi * fin_height_m * (diameter_m + fin_height_m)
    return (faces + np.pi * tip * fin_thickness_m) / fin_pitch_m


def serrated_fin_area(
    *,
    diameter_m: Array,
    fin_height_m: Array,
    fin_thickness_m: Array,
    fin_pitch_m: Array,
    segment_width_m: Array,
    cut_depth_m: Array,
) -> Array:
    """Surface of serrated (strip-cut) fins, per metre of tube.

    Parameters
    ----------
    diameter_m : Array
        Root diameter d [m].
    fin_height_m, fin_thickness_m, fin_pitch_m : Array
        Fin height, thickness and pitch [m].
    segment_width_m : Array
        Width of a segment, measured at the root of the cuts [m].
    cut_depth_m : Array
        Depth of the cuts from the tip [m]; below it stands an uncut ring.

    Returns
    -------
    Array
        Ring faces, segment faces, segment sides and segment tips [m2/m].

    Notes
    -----
    Segments are strips of constant width, pi d_1 / w_s of them on the uncut ring of diameter
    d_1 = d + 2 (h - c): the definition of Weierman (1976), in SI.
    """
    ring = fin_height_m - cut_depth_m
    root_of_cuts = diameter_m + 2.0 * ring
    faces = 2.0 * np.pi * ring * (diameter_m + ring)
    segments = np.pi * root_of_cuts / segment_width_m
    strip = 2.0 * cut_depth_m * (segment_width_m + fin_thickness_m) + segment_width_m * fin_thickness_m
    return (faces + segments * strip) / fin_pitch_m


def annular_area_ratio(
    *, diameter_m: Array, fin_height_m: Array, fin_thickness_m: Array, fin_pitch_m: Array
) -> Array:
    """Outside surface of a tube with annular fins over that of the bare tube.

    Parameters
    ----------
    diameter_m : Array
        Root diameter [m].
    fin_height_m, fin_thickness_m, fin_pitch_m : Array
        Fin height, thickness and pitch [m].

    Returns
    -------
    Array
        (A_prime + A_fin) / (pi d) [-].
    """
    prime = prime_area(diameter_m=diameter_m, fin_thickness_m=fin_thickness_m, fin_pitch_m=fin_pitch_m)
    fin = annular_fin_area(
        diameter_m=diameter_m,
        fin_height_m=fin_height_m,
        fin_thickness_m=fin_thickness_m,
        fin_pitch_m=fin_pitch_m,
    )
    return (prime + fin) / (np.pi * diameter_m)


def plate_areas(
    *,
    diameter_m: Array,
    fin_thickness_m: Array,
    fin_pitch_m: Array,
    transverse_pitch_m: Array,
    longitudinal_pitch_m: Array,
    rows: Array,
) -> tuple[Array, Array]:
    """Plate and collar surface of one tube with its share of the plates, per metre of tube.

    Parameters
    ----------
    diameter_m : Array
        Collar diameter [m].
    fin_thickness_m, fin_pitch_m : Array
        Plate thickness and pitch [m].
    transverse_pitch_m, longitudinal_pitch_m : Array
        Tube pitches; a plate is ``rows`` longitudinal pitches deep [m].
    rows : Array
        Rows along the outside stream; the leading and the trailing edge are shared by them.

    Returns
    -------
    tuple of Array
        Fin area and prime (collar) area [m2/m].
    """
    faces = 2.0 * (transverse_pitch_m * longitudinal_pitch_m - 0.25 * np.pi * diameter_m**2)
    edges = 2.0 * transverse_pitch_m * fin_thickness_m / rows
    fin = np.maximum(faces, 0.0) / fin_pitch_m + edges / fin_pitch_m
    prime = prime_area(diameter_m=diameter_m, fin_thickness_m=fin_thickness_m, fin_pitch_m=fin_pitch_m)
    return fin, prime


def blocked_width(
    *, diameter_m: Array, fin_height_m: Array, fin_thickness_m: Array, fin_pitch_m: Array
) -> Array:
    """Width of the stream one finned tube blocks, averaged along the tube.

    Parameters
    ----------
    diameter_m : Array
        Root diameter [m].
    fin_height_m, fin_thickness_m, fin_pitch_m : Array
        Fin height, thickness and pitch [m].

    Returns
    -------
    Array
        d + 2 h t / pitch [m]; serrated fins are counted as uncut.
    """
    return diameter_m + 2.0 * fin_height_m * fin_thickness_m / fin_pitch_m


def diagonal_pitch(*, transverse_pitch_m: Array, longitudinal_pitch_m: Array) -> Array:
    """Distance between neighbouring tubes of successive staggered rows.

    Parameters
    ----------
    transverse_pitch_m, longitudinal_pitch_m : Array
        Tube pitches [m].

    Returns
    -------
    Array
        sqrt((P_t/2)^2 + P_l^2) [m].
    """
    return np.hypot(0.5 * transverse_pitch_m, longitudinal_pitch_m)


def free_width(
    *,
    arrangement: Array | float,
    transverse_pitch_m: Array,
    longitudinal_pitch_m: Array,
    blocked_width_m: Array,
    rows: Array | float = 2.0,
) -> Array:
    """Narrowest free width of one transverse pitch.

    Parameters
    ----------
    arrangement : Array or float
        1 for staggered, 0 for in-line.
    transverse_pitch_m, longitudinal_pitch_m : Array
        Tube pitches [m].
    blocked_width_m : Array
        What one tube blocks [m].
    rows : Array or float
        Rows; a single row has no diagonal gaps.

    Returns
    -------
    Array
        The transverse gap, or in a staggered bank the two diagonal gaps where they are narrower [m];
        at least a millionth of the transverse pitch.
    """
    transverse = transverse_pitch_m - blocked_width_m
    diagonal = diagonal_pitch(
        transverse_pitch_m=transverse_pitch_m, longitudinal_pitch_m=longitudinal_pitch_m
    )
    has_diagonal = (np.asarray(arrangement) > 0.5) & (np.asarray(rows) > 1.5)
    width = np.where(has_diagonal, np.minimum(transverse, 2.0 * (diagonal - blocked_width_m)), transverse)
    return np.maximum(width, _LEAST_SHARE * transverse_pitch_m)


def row_factor(rows: Array) -> Array:
    """Mean coefficient of a shallow finned bank over that of a deep one.

    Parameters
    ----------
    rows : Array
        Rows along the outside stream.

    Returns
    -------
    Array
        0.76, 0.84, 0.92 for 1, 2, 3 rows and 1 from 4 rows on [-].

    Notes
    -----
    ESDU 86022 (1986), as printed by Hewitt, Shires & Bott (1994).
    """
    return np.interp(rows, [1.0, 2.0, 3.0, 4.0], [0.76, 0.84, 0.92, 1.0])
