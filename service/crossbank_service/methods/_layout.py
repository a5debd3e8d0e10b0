"""Geometry of plain tube banks that the correlations are written in: gaps, free area, void fraction."""

import numpy as np

from crossbank_service.methods.record import Array, Mask

LEAST_GAP_RATIO = 0.01
LEAST_VOID_FRACTION = 0.05


def is_staggered(arrangement: Array) -> Mask:
    """Truth of the arrangement's number: 1 staggered, 0 in-line."""
    return arrangement > 0.5


def diagonal_pitch_ratio(transverse_pitch_ratio: Array, longitudinal_pitch_ratio: Array) -> Array:
    """Distance between nearest tubes of neighbouring staggered rows over the diameter, c [-].

    Notes
    -----
    c = sqrt((a/2)^2 + b^2).
    """
    half = 0.5 * transverse_pitch_ratio
    return np.sqrt(half * half + longitudinal_pitch_ratio * longitudinal_pitch_ratio)


def diagonal_gap_ratio(transverse_pitch_ratio: Array, longitudinal_pitch_ratio: Array) -> Array:
    """Both diagonal gaps of one transverse pitch over the diameter, 2(c - 1) [-], kept positive."""
    c = diagonal_pitch_ratio(transverse_pitch_ratio, longitudinal_pitch_ratio)
    return np.maximum(2.0 * (c - 1.0), LEAST_GAP_RATIO)


def transverse_gap_ratio(transverse_pitch_ratio: Array) -> Array:
    """Transverse gap over the diameter, a - 1 [-], kept positive."""
    return np.maximum(transverse_pitch_ratio - 1.0, LEAST_GAP_RATIO)


def diagonal_governs(
    transverse_pitch_ratio: Array,
    longitudinal_pitch_ratio: Array,
    arrangement: Array,
    rows: Array | None = None,
) -> Mask:
    """Whether the narrowest section lies in the diagonal gaps.

    Parameters
    ----------
    transverse_pitch_ratio, longitudinal_pitch_ratio : Array
        a, b [-].
    arrangement : Array
        1 for staggered, 0 for in-line.
    rows : Array, optional
        n [-]; one row alone has no diagonal. Left out: a bank of two rows or more.

    Returns
    -------
    NDArray of bool
        True where 2(c - 1) < a - 1 in a staggered bank.
    """
    narrower = diagonal_gap_ratio(transverse_pitch_ratio, longitudinal_pitch_ratio) < transverse_gap_ratio(
        transverse_pitch_ratio
    )
    governs = is_staggered(arrangement) & narrower
    return governs if rows is None else governs & (rows > 1.0)


def free_area_ratio(
    transverse_pitch_ratio: Array,
    longitudinal_pitch_ratio: Array,
    arrangement: Array,
    rows: Array | None = None,
) -> Array:
    """Narrowest section over the empty duct's section, sigma [-].

    Parameters
    ----------
    transverse_pitch_ratio, longitudinal_pitch_ratio : Array
        a, b [-].
    arrangement : Array
        1 for staggered, 0 for in-line.
    rows : Array, optional
        n [-]; one row alone has no diagonal. Left out: a bank of two rows or more.

    Returns
    -------
    Array
        (a - 1)/a, or 2(c - 1)/a where the diagonal gap governs.
    """
    gap = np.where(
        diagonal_governs(transverse_pitch_ratio, longitudinal_pitch_ratio, arrangement, rows),
        diagonal_gap_ratio(transverse_pitch_ratio, longitudinal_pitch_ratio),
        transverse_gap_ratio(transverse_pitch_ratio),
    )
    return gap / transverse_pitch_ratio


def void_fraction(transverse_pitch_ratio: Array, longitudinal_pitch_ratio: Array) -> Array:
    """Void fraction psi [-] as the single-row method defines it.

    Notes
    -----
    psi = 1 - pi/(4a) for b >= 1 and 1 - pi/(4ab) for b < 1 (Gnielinski 1979). Tubes that touch leave 0.093;
    pitches no tubes can have are held at 0.05.
    """
    b = np.minimum(longitudinal_pitch_ratio, 1.0)
    return np.maximum(1.0 - 0.25 * np.pi / (transverse_pitch_ratio * b), LEAST_VOID_FRACTION)


def volumetric_diameter_ratio(transverse_pitch_ratio: Array, longitudinal_pitch_ratio: Array) -> Array:
    """Four times the void volume over the tube surface, per diameter: 4ab/pi - 1 [-], kept positive."""
    return np.maximum(
        4.0 / np.pi * transverse_pitch_ratio * longitudinal_pitch_ratio - 1.0, LEAST_VOID_FRACTION
    )
