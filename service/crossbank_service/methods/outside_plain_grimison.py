"""Plain tube banks, outside heat transfer: Grimison 1937, constants by pitches."""

from itertools import pairwise

import numpy as np

from crossbank_service.methods import _rows
from crossbank_service.methods._blend import elementwise, log_reynolds
from crossbank_service.methods._layout import is_staggered
from crossbank_service.methods._triangles import Triangulation
from crossbank_service.methods.record import Array, DerivedLimit, Limit, Mask, Method

_PITCHES = (1.25, 1.5, 2.0, 3.0)

# {(a, b): (C1, m)}
_INLINE = {
    (1.25, 1.25): (0.348, 0.592),
    (1.5, 1.25): (0.275, 0.608),
    (2.0, 1.25): (0.100, 0.704),
    (3.0, 1.25): (0.0633, 0.752),
    (1.25, 1.5): (0.367, 0.586),
    (1.5, 1.5): (0.250, 0.620),
    (2.0, 1.5): (0.101, 0.702),
    (3.0, 1.5): (0.0678, 0.744),
    (1.25, 2.0): (0.418, 0.570),
    (1.5, 2.0): (0.299, 0.602),
    (2.0, 2.0): (0.229, 0.632),
    (3.0, 2.0): (0.198, 0.648),
    (1.25, 3.0): (0.290, 0.601),
    (1.5, 3.0): (0.357, 0.584),
    (2.0, 3.0): (0.374, 0.581),
    (3.0, 3.0): (0.286, 0.608),
}
_STAGGERED = {
    (3.0, 0.6): (0.213, 0.636),
    (2.0, 0.9): (0.446, 0.571),
    (3.0, 0.9): (0.401, 0.581),
    (1.5, 1.0): (0.497, 0.558),
    (2.0, 1.125): (0.478, 0.565),
    (3.0, 1.125): (0.518, 0.560),
    (1.25, 1.25): (0.518, 0.556),
    (1.5, 1.25): (0.505, 0.554),
    (2.0, 1.25): (0.519, 0.556),
    (3.0, 1.25): (0.522, 0.562),
    (1.25, 1.5): (0.451, 0.568),
    (1.5, 1.5): (0.460, 0.562),
    (2.0, 1.5): (0.452, 0.568),
    (3.0, 1.5): (0.488, 0.568),
    (1.25, 2.0): (0.404, 0.572),
    (1.5, 2.0): (0.416, 0.568),
    (2.0, 2.0): (0.482, 0.556),
    (3.0, 2.0): (0.449, 0.570),
    (1.25, 3.0): (0.310, 0.592),
    (1.5, 3.0): (0.356, 0.580),
    (2.0, 3.0): (0.440, 0.562),
    (3.0, 3.0): (0.428, 0.574),
}
# The six triangles of the sparse rows b < 1.25 that no rectangle of the table covers.
_SPARSE = (
    ((1.25, 1.25), (1.5, 1.0), (1.5, 1.25)),
    ((1.5, 1.0), (2.0, 1.125), (1.5, 1.25)),
    ((1.5, 1.25), (2.0, 1.125), (2.0, 1.25)),
    ((1.5, 1.0), (2.0, 0.9), (2.0, 1.125)),
    ((1.5, 1.0), (3.0, 0.6), (2.0, 0.9)),
    ((2.0, 0.9), (3.0, 0.6), (3.0, 0.9)),
)
_ROWS = tuple(float(n) for n in range(1, 11))
_ROWS_INLINE = (0.64, 0.80, 0.87, 0.90, 0.92, 0.94, 0.96, 0.98, 0.99, 1.0)
_ROWS_STAGGERED = (0.68, 0.75, 0.83, 0.89, 0.92, 0.95, 0.97, 0.98, 0.99, 1.0)

_Point = tuple[float, float]


def _rectangles(pitches_b: tuple[float, ...], pitches_a: tuple[float, ...]) -> list[tuple[_Point, ...]]:
    return [
        ((a1, b1), (a2, b1), (a2, b2), (a1, b2))
        for a1, a2 in pairwise(pitches_a)
        for b1, b2 in pairwise(pitches_b)
    ]


def _table(
    constants: dict[_Point, tuple[float, float]],
    rectangles: list[tuple[_Point, ...]],
    triangles: tuple[tuple[_Point, ...], ...],
    hull: tuple[_Point, ...],
) -> tuple[Triangulation, tuple[float, ...], tuple[float, ...]]:
    """Triangulate a table, ln C1 and m at its nodes; a rectangle's middle has the mean of its corners."""
    nodes = list(constants)
    ln_c = [float(np.log(c)) for c, _ in constants.values()]
    exponents = [m for _, m in constants.values()]
    corners = [tuple(nodes.index(point) for point in triangle) for triangle in triangles]
    for rectangle in rectangles:
        ring = [nodes.index(point) for point in rectangle]
        middle = len(nodes)
        nodes.append((sum(p[0] for p in rectangle) / 4, sum(p[1] for p in rectangle) / 4))
        ln_c.append(sum(ln_c[i] for i in ring) / 4)
        exponents.append(sum(exponents[i] for i in ring) / 4)
        corners += [(i, j, middle) for i, j in zip(ring, [*ring[1:], ring[0]], strict=True)]
    triangulation = Triangulation(
        nodes=tuple(nodes),
        triangles=tuple((c[0], c[1], c[2]) for c in corners),
        hull=tuple(nodes.index(point) for point in hull),
    )
    return triangulation, tuple(ln_c), tuple(exponents)


_INLINE_TABLE = _table(
    _INLINE, _rectangles(_PITCHES, _PITCHES), (), ((1.25, 1.25), (3.0, 1.25), (3.0, 3.0), (1.25, 3.0))
)
_STAGGERED_TABLE = _table(
    _STAGGERED,
    _rectangles(_PITCHES, _PITCHES) + _rectangles((0.9, 1.125, 1.25), (2.0, 3.0)),
    _SPARSE,
    ((1.25, 1.25), (1.5, 1.0), (3.0, 0.6), (3.0, 3.0), (1.25, 3.0)),
)


def _constants(
    table: tuple[Triangulation, tuple[float, ...], tuple[float, ...]], a: Array, b: Array
) -> tuple[Array, Array]:
    triangulation, ln_c, exponents = table
    held_a, held_b, _ = triangulation.held(a, b)
    ln_coefficient, exponent = triangulation.interpolate(held_a, held_b, (ln_c, exponents))
    return ln_coefficient, exponent


def _distance(
    *, transverse_pitch_ratio: Array, longitudinal_pitch_ratio: Array, arrangement: Array, **_others: Array
) -> Array:
    a, b = np.broadcast_arrays(
        np.asarray(transverse_pitch_ratio, dtype=np.float64),
        np.asarray(longitudinal_pitch_ratio, dtype=np.float64),
    )
    return np.where(
        is_staggered(np.asarray(arrangement)),
        _STAGGERED_TABLE[0].held(a, b)[2],
        _INLINE_TABLE[0].held(a, b)[2],
    )


def _mean_factor(rows: Array, staggered: Mask) -> Array:
    return np.where(staggered, np.interp(rows, _ROWS, _ROWS_STAGGERED), np.interp(rows, _ROWS, _ROWS_INLINE))


@elementwise
def grimison_1937(
    *,
    reynolds: Array,
    prandtl: Array,
    transverse_pitch_ratio: Array,
    longitudinal_pitch_ratio: Array,
    arrangement: Array,
    rows: Array,
) -> Array:
    """Mean Nusselt number of a plain bank after Grimison 1937.

    Parameters
    ----------
    reynolds : Array
        Re in the narrowest section, on the tube diameter, film properties [-].
    prandtl : Array
        Pr of the film [-].
    transverse_pitch_ratio, longitudinal_pitch_ratio : Array
        a, b [-].
    arrangement : Array
        1 for staggered, 0 for in-line.
    rows : Array
        n [-].

    Returns
    -------
    Array
        Nu on the tube diameter, mean over the rows [-].

    Notes
    -----
    Nu = 1.13 C1 Re^m Pr^(1/3) C2 (E. D. Grimison, Trans. ASME 59 (1937) 583-594, with the Prandtl number as
    in Incropera & DeWitt). 2000 < Re < 40000, Pr > 0.7. ln Nu at the running Re is linear on the triangulated
    nodes of the table; each rectangle of nodes is split by both diagonals, its middle having the mean of the
    four corners. Outside the nodes' hull the nearest point of the hull.
    """
    a, b = np.broadcast_arrays(transverse_pitch_ratio, longitudinal_pitch_ratio)
    staggered = is_staggered(arrangement)
    ln_inline, m_inline = _constants(_INLINE_TABLE, a, b)
    ln_staggered, m_staggered = _constants(_STAGGERED_TABLE, a, b)
    ln_coefficient = np.where(staggered, ln_staggered, ln_inline)
    exponent = np.where(staggered, m_staggered, m_inline)
    law = np.exp(ln_coefficient + exponent * log_reynolds(reynolds))
    return 1.13 * law * np.cbrt(prandtl) * _mean_factor(rows, staggered)


@elementwise
def grimison_1937_row_share(*, row: Array, rows: Array, arrangement: Array, **_others: Array) -> Array:
    """Local coefficient of a row over the bank's mean, from the differences of i C2_i."""
    staggered = is_staggered(arrangement)
    return _rows.share_of_row(
        row, _mean_factor(row, staggered), _mean_factor(row - 1.0, staggered), _mean_factor(rows, staggered)
    )


GRIMISON_1937 = Method(
    slug="grimison-1937",
    role="outside_heat_transfer",
    surfaces=("plain",),
    arrangements=("inline", "staggered"),
    gives="nusselt",
    function=grimison_1937,
    inputs=(
        "reynolds",
        "prandtl",
        "transverse_pitch_ratio",
        "longitudinal_pitch_ratio",
        "arrangement",
        "rows",
    ),
    limits=(
        Limit(quantity="reynolds", at_least=2000.0, at_most=40000.0),
        Limit(quantity="prandtl", at_least=0.65),
    ),
    derived_limits=(
        DerivedLimit(
            name="distance of the pitch ratios from the nearest pitches of the table",
            value=_distance,
            at_most=1e-9,
        ),
    ),
    source="E. D. Grimison, Trans. ASME 59 (1937) 583-594",
    doubt="One textbook prints 1.11 in place of 1.13 (1.8 % lower). The measurements were made with air.",
    note=(
        "Film properties. ln Nu at the running Reynolds number is linear on the triangulated nodes of the "
        "table (each rectangle split by both diagonals); outside their hull the nearest point of the hull. "
        "The least Prandtl number is printed as 0.7 and read to that digit (0.65), which takes in hot air."
    ),
    scatter_fraction=0.20,
    standard_uncertainty_fraction=0.09,
    properties_at="film",
    row_share=grimison_1937_row_share,
)

RECORDS = (GRIMISON_1937,)
