"""Natural frequencies and mode shapes of tubes: closed forms, and finite elements for anything else."""

from dataclasses import dataclass
from functools import cache

import numpy as np
from numpy.typing import NDArray

from crossbank_service.methods.record import Array

Codes = NDArray[np.int64]

PINNED, FIXED_PINNED, FIXED, FIXED_FREE = 0, 1, 2, 3
ENDS = {"pinned": PINNED, "fixed-pinned": FIXED_PINNED, "fixed": FIXED, "fixed-free": FIXED_FREE}

# First roots of the frequency equations of one span and effective length factors in buckling.
_LAMBDA = np.array([np.pi, 3.926602312047919, 4.730040744862704, 1.875104068711961])
_BUCKLING_LENGTH = np.array([1.0, 0.6991556596428412, 0.5, 2.0])

# Every span is reported in this many cells of equal length, whatever the number of elements.
CELLS = 8

# f = k/(2 pi R^2) sqrt(E I/m) of a semicircular bend whose straight legs of length s are clamped at their
# ends, for s/R = 0, 0.25, ... 4. From tests/reference/generate_u_bends.py, Poisson's ratio 0.3.
_BEND_LEG_STEP = 0.25
_BEND_OUT_OF_PLANE = np.array(
    (
        1.8193,
        1.3099,
        0.9849,
        0.7651,
        0.6105,
        0.4981,
        0.4140,
        0.3496,
        0.2991,
        0.2589,
        0.2264,
        0.1996,
        0.1774,
        0.1587,
        0.1428,
        0.1292,
        0.1175,
    )
)
_BEND_IN_PLANE = np.array(
    (
        4.3844,
        2.9605,
        2.1011,
        1.5621,
        1.2066,
        0.9606,
        0.7835,
        0.6517,
        0.5509,
        0.4720,
        0.4090,
        0.3580,
        0.3160,
        0.2811,
        0.2517,
        0.2267,
        0.2053,
    )
)


def single_span_frequency(
    *, length_m: Array, stiffness_n_m2: Array, mass_kg_m: Array, ends: Codes, axial_force_n: Array
) -> Array:
    """Lowest natural frequency of one span in closed form, f [Hz].

    Parameters
    ----------
    length_m, stiffness_n_m2, mass_kg_m : Array
        L [m], E I [N m2], m [kg/m].
    ends : NDArray of int
        Code of the ends, see ``ENDS``.
    axial_force_n : Array
        N [N], tension positive.

    Returns
    -------
    Array
        f = lambda^2/(2 pi L^2) sqrt(E I/m) sqrt(1 + N/Ncr), Ncr = pi^2 E I/(K L)^2; 0 where buckled.

    Notes
    -----
    Exact for pinned ends; for the others the axial factor errs by -0.6, -0.8, -1.9 % at N/Ncr = -0.5 (one
    end fixed, both fixed, cantilever) and by +0.9, +1.3, +3.3 % at +1. lambda: Blevins, Formulas for
    Natural Frequency and Mode Shape, Table 8-1.
    """
    lam, k = _LAMBDA[ends], _BUCKLING_LENGTH[ends]
    critical = np.pi**2 * stiffness_n_m2 / (k * length_m) ** 2
    axial = np.sqrt(np.maximum(1.0 + axial_force_n / critical, 0.0))
    return lam**2 / (2.0 * np.pi * length_m**2) * np.sqrt(stiffness_n_m2 / mass_kg_m) * axial


def equal_span_eigenvalue(span_count: Array, ends: Codes) -> Array:
    """Lambda of the lowest mode of a tube on equal spans, per span [-].

    Parameters
    ----------
    span_count : Array
        Number of spans [-].
    ends : NDArray of int
        ``PINNED``, ``FIXED_PINNED`` or ``FIXED``.

    Returns
    -------
    Array
        The root of (sinh l cos l - cosh l sin l)/(sinh l - sin l) = cos(mu) in [pi, 4.7300].

    Notes
    -----
    Periodic beam on point supports; mu = pi for pinned ends, (N-1) pi/N for both ends fixed (4.7300 for N =
    1) and (2N-1) pi/(2N) for one. Equal to Blevins, Table 8-4.
    """
    n = span_count
    mu = np.where(
        ends == FIXED, np.pi * (n - 1.0) / n, np.where(ends == FIXED_PINNED, np.pi * (n - 0.5) / n, np.pi)
    )
    target = np.cos(mu)
    low = np.full(np.shape(target), np.pi)
    high = np.full(np.shape(target), _LAMBDA[FIXED])
    for _ in range(60):
        mid = 0.5 * (low + high)
        sinh, cosh, sin, cos = np.sinh(mid), np.cosh(mid), np.sin(mid), np.cos(mid)
        below = (sinh * cos - cosh * sin) / (sinh - sin) < target
        low, high = np.where(below, mid, low), np.where(below, high, mid)
    return np.where(ends == PINNED, np.pi, 0.5 * (low + high))


def equal_spans_needed(
    *,
    required_frequency_hz: Array,
    total_length_m: Array,
    stiffness_n_m2: Array,
    mass_kg_m: Array,
    ends: Codes,
    axial_force_n: Array,
    most: int = 60,
) -> Array:
    """Smallest number of equal spans whose lowest mode reaches a frequency [-].

    Parameters
    ----------
    required_frequency_hz, total_length_m, stiffness_n_m2, mass_kg_m : Array
        f [Hz], length over all spans [m], E I [N m2], m [kg/m].
    ends : NDArray of int
        ``PINNED``, ``FIXED_PINNED`` or ``FIXED``.
    axial_force_n : Array
        N [N]; its effect is taken on one pinned span (exact for pinned ends, cautious in compression else).
    most : int
        Largest number tried.

    Returns
    -------
    Array
        The number of spans; ``most + 1`` where even ``most`` are too few.
    """
    shape = np.broadcast_shapes(
        *(
            np.shape(v)
            for v in (required_frequency_hz, total_length_m, stiffness_n_m2, mass_kg_m, ends, axial_force_n)
        )
    )
    needed = np.full(shape, float(most + 1))
    for count in range(most, 0, -1):
        span = total_length_m / count
        lam = equal_span_eigenvalue(np.full(np.shape(ends), float(count)), ends)
        critical = np.pi**2 * stiffness_n_m2 / span**2
        axial = np.sqrt(np.maximum(1.0 + axial_force_n / critical, 0.0))
        f = lam**2 / (2.0 * np.pi * span**2) * np.sqrt(stiffness_n_m2 / mass_kg_m) * axial
        needed = np.where(f >= required_frequency_hz, float(count), needed)
    return needed


def u_bend_frequency(
    *, bend_radius_m: Array, leg_length_m: Array, stiffness_n_m2: Array, mass_kg_m: Array
) -> tuple[Array, Array]:
    """Lowest natural frequencies of a U-bend out of its plane and in it [Hz].

    Parameters
    ----------
    bend_radius_m : Array
        R of the centre line [m].
    leg_length_m : Array
        Straight length s between bend and support [m], clamped there.
    stiffness_n_m2, mass_kg_m : Array
        E I [N m2], m [kg/m].

    Notes
    -----
    f = k/(2 pi R^2) sqrt(E I/m), k(s/R) interpolated in ln k; Poisson's ratio 0.3, inextensible centre
    line. Beyond s/R = 4, k falls as (R/s)^2, which is on the low side. Without legs k = 1.8193 and 4.3844,
    the roots of Love's ring equations.
    """
    x = leg_length_m / bend_radius_m
    last = _BEND_LEG_STEP * (_BEND_IN_PLANE.size - 1)
    nodes = _BEND_LEG_STEP * np.arange(_BEND_IN_PLANE.size)
    inner, outer = np.minimum(x, last), np.maximum(x, last)
    base = np.sqrt(stiffness_n_m2 / mass_kg_m) / (2.0 * np.pi * bend_radius_m**2) * (last / outer) ** 2
    k_out, k_in = (np.exp(np.interp(inner, nodes, np.log(k))) for k in (_BEND_OUT_OF_PLANE, _BEND_IN_PLANE))
    return k_out * base, k_in * base


def without_alternate_supports(spans_m: Array) -> Array:
    """Spans (N, S) with every second intermediate support taken away: pairs joined from the first end."""
    if spans_m.shape[-1] % 2:
        spans_m = np.concatenate([spans_m, np.zeros((*spans_m.shape[:-1], 1))], axis=-1)
    return spans_m[..., 0::2] + spans_m[..., 1::2]


def span_frequencies(
    *, spans_m: Array, stiffness_n_m2: Array, mass_kg_m: Array, axial_force_n: Array
) -> Array:
    """Frequency of every span by itself on pinned ends [Hz], (N, S); absent spans (0) get a very high one."""
    return single_span_frequency(
        length_m=np.where(spans_m > 0.0, spans_m, 1e-3),
        stiffness_n_m2=stiffness_n_m2[:, None],
        mass_kg_m=mass_kg_m[:, None],
        ends=np.full(spans_m.shape, PINNED),
        axial_force_n=axial_force_n[:, None],
    )


@dataclass(frozen=True)
class Modes:
    """Lowest modes of N tubes on up to S spans; shapes are scaled to a largest displacement of 1.

    Attributes
    ----------
    frequency_hz : Array, (N, M)
        Natural frequencies, ascending; 0 where the axial force has buckled the tube in that mode.
    stable : NDArray of bool, (N,)
        Whether the axial force leaves every mode a frequency.
    shape : Array, (N, M, S, 9)
        Displacement at the bounds of the eight cells of every span; 0 in spans a tube does not have.
    squared_m, absolute_m : Array, (N, M, S, 8)
        Integrals of phi^2 and of its modulus over every cell [m].
    modal_mass_m : Array, (N, M)
        Integral of (m/m0) phi^2 over the tube [m].
    """

    frequency_hz: Array
    stable: NDArray[np.bool_]
    shape: Array
    squared_m: Array
    absolute_m: Array
    modal_mass_m: Array


def tube_modes(
    *,
    spans_m: Array,
    stiffness_n_m2: Array,
    mass_kg_m: Array,
    ends: Codes,
    axial_force_n: Array,
    mass_ratio: Array | None = None,
    modes: int = 10,
) -> Modes:
    """Lowest modes of tubes on point supports, unequal spans and axial force included.

    Parameters
    ----------
    spans_m : Array, (N, S)
        Spans from the first end [m]; 0 behind the last span of a tube that has fewer than S.
    stiffness_n_m2, mass_kg_m, axial_force_n : Array, (N,)
        E I [N m2], m0 [kg/m], N [N] (tension positive).
    ends : NDArray of int, (N,)
        Code of the ends, see ``ENDS``; ``FIXED_PINNED`` is fixed at the first end, ``FIXED_FREE`` has no
        support at the far end of the last span.
    mass_ratio : Array, (N, S), optional
        m/m0 of every span (fins may end at the duct wall); 1 where left out.
    modes : int
        How many; at most 16.

    Returns
    -------
    Modes

    Notes
    -----
    Hermite beam elements with consistent mass and geometric stiffness, 8 or more a span (a multiple of 8
    that gives four elements per half wave of the highest mode on equal spans). Error on three fixed spans
    below 0.01 % in the first and 0.1 % in the sixth mode. Tubes with the same dimensionless data are solved
    once.
    """
    n, s = spans_m.shape
    mass_ratio = np.ones((n, s)) if mass_ratio is None else np.broadcast_to(mass_ratio, (n, s))
    reference = np.max(spans_m, axis=-1)
    tension = axial_force_n * reference**2 / stiffness_n_m2
    count = np.count_nonzero(spans_m > 0.0, axis=-1)
    scaled = spans_m / reference[:, None]
    data = np.concatenate([scaled, np.where(scaled > 0.0, mass_ratio, 0.0), tension[:, None]], axis=-1) + 0.0
    omega2 = np.zeros((n, modes))
    shape = np.zeros((n, modes, s, CELLS + 1))
    squared, absolute = np.zeros((2, n, modes, s, CELLS))
    # Groups share the number of spans and the ends; a group is solved in blocks that fit the memory.
    for spans, end in sorted(set(zip(count.tolist(), ends.tolist(), strict=True))):
        members = np.flatnonzero((count == spans) & (ends == end))
        unique, inverse = np.unique(data[members], axis=0, return_inverse=True)
        per_span = CELLS * -(-max(CELLS, -(-4 * modes // spans)) // CELLS)
        block = max(1, int(4e6 / (2 * spans * per_span + 2) ** 2))
        parts = [
            _solve(
                spans=u[:, :spans],
                mass_ratio=u[:, s : s + spans],
                tension=u[:, -1],
                end=end,
                per_span=per_span,
                modes=modes,
            )
            for u in np.array_split(unique, -(-len(unique) // block))
        ]
        solved = [np.concatenate(arrays)[inverse.reshape(-1)] for arrays in zip(*parts, strict=True)]
        omega2[members] = solved[0]
        for whole, part in zip((shape, squared, absolute), solved[1:], strict=True):
            whole[members, :, :spans] = part
    size = reference[:, None]
    squared = squared * size[..., None, None]
    radian = np.sqrt(np.maximum(omega2, 0.0)) * np.sqrt(stiffness_n_m2 / mass_kg_m)[:, None] / size**2
    modal_mass = over_spans(np.sum(squared, axis=-1) * mass_ratio[:, None, :])
    return Modes(
        frequency_hz=radian / (2.0 * np.pi),
        stable=omega2[:, 0] > 0.0,
        shape=shape,
        squared_m=squared,
        absolute_m=absolute * size[..., None, None],
        modal_mass_m=modal_mass,
    )


def over_spans(values: Array) -> Array:
    """Sum over the last axis, span after span, so that absent spans (zeros) never change the rounding."""
    total = values[..., 0]
    for i in range(1, values.shape[-1]):
        total = total + values[..., i]
    return total


@cache
def _hermite(points: int) -> tuple[Array, Array, Array]:
    """Weights, and the four cubic shape functions at Gauss points of the unit element."""
    x, w = np.polynomial.legendre.leggauss(points)
    x = 0.5 * (x + 1.0)
    functions = np.stack(
        [1.0 - 3.0 * x**2 + 2.0 * x**3, x - 2.0 * x**2 + x**3, 3.0 * x**2 - 2.0 * x**3, x**3 - x**2]
    )
    return x, 0.5 * w, functions


def _solve(
    *, spans: Array, mass_ratio: Array, tension: Array, end: int, per_span: int, modes: int
) -> tuple[Array, Array, Array, Array]:
    """Eigenvalues and shapes of tubes of one kind, scaled so that E I = m0 = longest span = 1."""
    g, s = spans.shape
    elements = s * per_span
    size = 2 * (elements + 1)
    h = np.repeat(spans / per_span, per_span, axis=-1)
    mu = np.repeat(mass_ratio, per_span, axis=-1)
    stiffness, mass = np.zeros((2, g, size, size))
    for e in range(elements):
        at = slice(2 * e, 2 * e + 4)
        stiffness[:, at, at] += _element_stiffness(h[:, e], tension)
        mass[:, at, at] += _element_mass(h[:, e], mu[:, e])
    held = [2 * per_span * i for i in range(s if end == FIXED_FREE else s + 1)]
    if end != PINNED:
        held.append(1)
    if end == FIXED:
        held.append(size - 1)
    free = np.setdiff1d(np.arange(size), held)
    stiffness = stiffness[:, free[:, None], free]
    root = np.linalg.cholesky(mass[:, free[:, None], free])
    half = np.linalg.solve(root, stiffness)
    reduced = np.linalg.solve(root, np.swapaxes(half, -1, -2))
    value, vector = np.linalg.eigh(0.5 * (reduced + np.swapaxes(reduced, -1, -2)))
    motion = np.zeros((g, size, modes))
    motion[:, free] = np.linalg.solve(np.swapaxes(root, -1, -2), vector[:, :, :modes])
    deflection, slope = motion[:, 0::2].swapaxes(1, 2), motion[:, 1::2].swapaxes(1, 2)
    # (g, modes, elements, points): the cubic at Gauss points that integrate its square exactly.
    _, weight, (n0, n1, n2, n3) = _hermite(4)
    step = h[:, None, :, None]
    inside = (
        deflection[..., :-1, None] * n0
        + slope[..., :-1, None] * step * n1
        + deflection[..., 1:, None] * n2
        + slope[..., 1:, None] * step * n3
    )
    largest = np.maximum(np.max(np.abs(inside), axis=(-1, -2)), np.max(np.abs(deflection), axis=-1))
    inside = inside / largest[..., None, None]
    nodes = deflection / largest[..., None]
    cells = (g, modes, s, CELLS, per_span // CELLS)
    squared = np.sum((np.sum(inside**2 * weight, axis=-1) * h[:, None, :]).reshape(cells), axis=-1)
    absolute = np.sum((np.sum(np.abs(inside) * weight, axis=-1) * h[:, None, :]).reshape(cells), axis=-1)
    stride = per_span // CELLS
    at_bounds = (per_span * np.arange(s))[:, None] + stride * np.arange(CELLS + 1)
    return value[:, :modes], nodes[:, :, at_bounds], squared, absolute


def _element_stiffness(h: Array, tension: Array) -> Array:
    """Bending and geometric stiffness of one element in every tube, (g, 4, 4)."""
    one = np.ones_like(h)
    bending = _symmetric((12.0 * one, 6.0 * h, -12.0 * one, 6.0 * h, 4.0 * h * h, -6.0 * h, 2.0 * h * h))
    axial = _symmetric((36.0 * one, 3.0 * h, -36.0 * one, 3.0 * h, 4.0 * h * h, -3.0 * h, -h * h))
    return bending / (h**3)[:, None, None] + axial * (tension / (30.0 * h))[:, None, None]


def _symmetric(entries: tuple[Array, ...]) -> Array:
    """Rows (a b c d), (b e f g), (c f a -b), (d g -b e)."""
    a, b, c, d, e, f, g = entries
    rows = ((a, b, c, d), (b, e, f, g), (c, f, a, -b), (d, g, -b, e))
    return np.stack([np.stack(row, axis=-1) for row in rows], axis=-2)


def _element_mass(h: Array, mu: Array) -> Array:
    """Consistent mass of one element in every tube, (g, 4, 4)."""
    one = np.ones_like(h)
    entries = _symmetric((156.0 * one, 22.0 * h, 54.0 * one, -13.0 * h, 4.0 * h * h, 13.0 * h, -3.0 * h * h))
    return entries * (mu * h / 420.0)[:, None, None]
