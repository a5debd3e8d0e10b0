"""Numerical helpers of the methods: smooth joins and a bracketed root search on arrays."""

from collections.abc import Callable

import numpy as np

from crossbank_service.methods.record import Array

Value = Array | float


def smooth_step(value: Value, start: float, end: float) -> Array:
    """Rise from 0 at ``start`` to 1 at ``end`` with zero slope at both, linear argument ``value``."""
    t = np.clip((np.asarray(value, dtype=np.float64) - start) / (end - start), 0.0, 1.0)
    weight: Array = t * t * (3.0 - 2.0 * t)
    return weight


def bracketed_root(
    function: Callable[[Array], Array], low: Value, high: Value, *, tolerance: float = 4e-15, most: int = 80
) -> Array:
    """Find a zero of ``function`` between ``low`` and ``high``, element by element.

    Parameters
    ----------
    function : callable
        Takes and returns arrays of the common shape; of opposite sign at the two ends of each element.
    low, high : array or float
        Ends of the brackets.
    tolerance : float
        Width of the bracket at which an element is finished, relative to its larger end.
    most : int
        Most evaluations.

    Returns
    -------
    array
        The zeros. Where the ends have the same sign, the end with the smaller residual.

    Notes
    -----
    Inverse quadratic interpolation guarded by bisection, T. R. Chandrupatla, Adv. Eng. Software 28
    (1997) 145-149. A finished element is frozen, so its value does not depend on its neighbours.
    """
    a, b = (
        np.array(x, dtype=np.float64)
        for x in np.broadcast_arrays(np.asarray(high, np.float64), np.asarray(low, np.float64))
    )
    fa, fb = function(a), function(b)
    same_sign = np.sign(fa) * np.sign(fb) > 0.0
    ends = np.where(np.abs(fa) < np.abs(fb), a, b)
    c, fc = a.copy(), fa.copy()
    t = np.full(a.shape, 0.5)
    found = np.where(same_sign, ends, b)
    done = same_sign.copy()
    for _ in range(most):
        x = np.where(done, found, a + t * (b - a))
        fx = function(x)
        same = np.sign(fx) == np.sign(fa)
        c, fc = np.where(same, a, b), np.where(same, fa, fb)
        b, fb = np.where(same, b, a), np.where(same, fb, fa)
        a, fa = x, fx
        best = np.where(np.abs(fa) < np.abs(fb), a, b)
        width = np.abs(b - a)
        limit = tolerance * np.maximum(np.abs(a), np.abs(b))
        finished = (fa == 0.0) | (width <= limit)
        found = np.where(done, found, best)
        done |= finished
        if done.all():
            break
        t = _next_fraction((a, b, c), (fa, fb, fc), limit)
    return np.where(done, found, np.where(np.abs(fa) < np.abs(fb), a, b))


def _next_fraction(
    points: tuple[Array, Array, Array], values: tuple[Array, Array, Array], limit: Array
) -> Array:
    """Where between the first two points to look next: inverse quadratic where safe, else the middle."""
    a, b, c = points
    fa, fb, fc = values
    tiny = np.finfo(np.float64).tiny
    gap = c - b
    rise = fc - fb
    xi = (a - b) / np.where(gap == 0.0, 1.0, gap)
    phi = (fa - fb) / np.where(rise == 0.0, 1.0, rise)
    safe = (gap != 0.0) & (rise != 0.0) & (phi**2 < xi) & ((1.0 - phi) ** 2 < 1.0 - xi)
    ba, ca, cb = fb - fa, fc - fa, fc - fb
    ok = safe & (ba != 0.0) & (ca != 0.0)
    ba, ca, cb = (np.where(ok, d, 1.0) for d in (ba, ca, cb))
    span = np.where(np.abs(b - a) < tiny, 1.0, b - a)
    guess = -(fa / ba) * (fc / cb) + (c - a) / span * (fa / ca) * (fb / cb)
    least = np.minimum(0.5 * limit / np.maximum(np.abs(b - a), tiny), 0.5)
    return np.clip(np.where(ok, guess, 0.5), least, 1.0 - least)
