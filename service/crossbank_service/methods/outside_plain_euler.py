"""Plain tube banks, outside pressure drop: the Euler number fits of Zukauskas & Ulinskas 1988."""

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np

from crossbank_service.methods._blend import JOIN_FACTOR, elementwise, joined, log_reynolds, rise
from crossbank_service.methods._layout import is_staggered
from crossbank_service.methods.outside_plain_gaddis import (
    INPUTS,
    gaddis_gnielinski_1985,
    gaddis_gnielinski_1985_resistances,
)
from crossbank_service.methods.record import Array, DerivedLimit, Limit, Method


@dataclass(frozen=True)
class _Fit:
    """Polynomial of Eu/k in 1/Re (or Re) between two Reynolds numbers; held at its ends."""

    low: float
    high: float
    coefficients: tuple[float, ...]
    inverse: bool = True

    def logarithm(self, reynolds: Array) -> Array:
        held = np.clip(reynolds, self.low, self.high)
        x = 1.0 / held if self.inverse else held
        total = np.full_like(x, self.coefficients[-1])
        for coefficient in reversed(self.coefficients[:-1]):
            total = total * x + coefficient
        return np.log(total)


_NODES = (1.25, 1.5, 2.0, 2.5)

# By longitudinal pitch ratio.
_INLINE: tuple[tuple[_Fit, ...], ...] = (
    (
        _Fit(3.0, 2e3, (0.272, 2.07e2, 1.02e2, -2.86e2)),
        _Fit(2e3, 2e6, (0.267, 2.49e3, -9.27e6, 1.0e10)),
    ),
    (
        _Fit(3.0, 2e3, (0.263, 8.67e1, -2.02)),
        _Fit(2e3, 2e6, (0.235, 1.97e3, -1.24e7, 3.12e10, -2.74e13)),
    ),
    (
        _Fit(7.0, 800.0, (0.188, 5.66e1, -6.46e2, 6.01e3, -1.83e4)),
        _Fit(800.0, 1e6, (0.247, -5.95e-7, 1.5e-12, -1.37e-18, 3.96e-25), inverse=False),
    ),
    (_Fit(600.0, 2e5, (0.177, -3.11e-7, 1.17e-12), inverse=False),),
)
# By transverse pitch ratio.
_STAGGERED: tuple[tuple[_Fit, ...], ...] = (
    (
        _Fit(3.0, 1e3, (0.795, 2.47e2, 3.35e2, -1.55e3, 2.41e3)),
        _Fit(1e3, 2e6, (0.245, 3.39e3, -9.84e6, 1.32e10, -5.99e12)),
    ),
    (
        _Fit(3.0, 1e3, (0.683, 1.11e2, -9.73e1, -4.26e2, 5.74e2)),
        _Fit(1e3, 2e6, (0.203, 2.48e3, -7.58e6, 1.04e10, -4.82e12)),
    ),
    (
        _Fit(7.0, 1e2, (0.713, 4.48e1, -1.26e2, -5.82e2)),
        _Fit(1e2, 1e4, (0.343, 3.03e2, -7.17e4, 8.80e6, -3.80e8)),
        _Fit(1e4, 2e6, (0.162, 1.81e3, 7.92e7, -1.65e12, 8.72e15)),
    ),
    (
        _Fit(1e2, 5e3, (0.330, 9.89e1, -1.48e4, 1.92e6, -8.62e7)),
        _Fit(5e3, 2e6, (0.119, 4.98e3, -5.07e7, 2.51e11, -4.63e14)),
    ),
)


def _log_decades(ln_re: Array, decades: Sequence[float], factors: Sequence[Array]) -> Array:
    """Linear in log10 Re between the factors of the decades, held outside."""
    log10_re = ln_re / np.log(10.0)
    result = factors[0]
    for decade, lower, upper in zip(decades, factors, factors[1:], strict=False):
        result = result + np.clip(log10_re - decade, 0.0, 1.0) * (upper - lower)
    return result


def _layout_quotient(a: Array, b: Array) -> Array:
    return (a - 1.0) / np.maximum(b - 1.0, 1e-3)


def _layout_factor_inline(ln_re: Array, a: Array, b: Array) -> Array:
    ln_x = np.log(np.clip(_layout_quotient(a, b), 0.06, 6.0))
    factors = (
        1.009 * np.exp(-0.744 * ln_x),
        1.007 * np.exp(-0.655 * ln_x),
        1.004 * np.exp(-0.539 * ln_x),
        1.03 * np.exp(-0.40 * ln_x),
    )
    return _log_decades(ln_re, (3.0, 4.0, 5.0), factors)


def _layout_factor_staggered(ln_re: Array, a: Array, b: Array) -> Array:
    x = np.clip(a / b, 0.45, 3.5)
    ln_x = np.log(x)
    factors = (
        np.where(x <= 1.25, 1.0, 0.93 * np.exp(0.48 * ln_x)),
        np.where(x <= 1.25, np.exp(-0.048 * ln_x), 0.951 * np.exp(0.284 * ln_x)),
        1.28 - 0.708 / x + 0.55 / (x * x) - 0.113 / (x * x * x),
        2.016 + x * (-1.675 + x * (0.948 + x * (-0.234 + x * 0.021))),
    )
    return _log_decades(ln_re, (2.0, 3.0, 4.0), factors)


def _interpolated(
    ln_re: Array, pitch: Array, fits: tuple[tuple[_Fit, ...], ...], ln_factor: Array, ln_slow: Array
) -> Array:
    """Interpolate ln xi between the tabulated pitches; each passes to the slow law at its own lowest Re."""
    reynolds = np.exp(ln_re)
    held = np.clip(pitch, _NODES[0], _NODES[-1])
    result = None
    for j, pieces in enumerate(fits):
        law = ln_factor + joined(
            ln_re, [piece.logarithm(reynolds) for piece in pieces], [piece.low for piece in pieces[1:]]
        )
        low = pieces[0].low
        covered = rise(ln_re, low / JOIN_FACTOR, low * JOIN_FACTOR)
        law = (1.0 - covered) * ln_slow + covered * law
        if result is None:
            result = law
        else:
            share = np.clip((held - _NODES[j - 1]) / (_NODES[j] - _NODES[j - 1]), 0.0, 1.0)
            result = (1.0 - share) * result + share * law
    if result is None:
        raise ValueError("no pitches to interpolate between")
    return result


@elementwise
def zukauskas_ulinskas_1988(
    *,
    reynolds: Array,
    transverse_pitch_ratio: Array,
    longitudinal_pitch_ratio: Array,
    arrangement: Array,
    rows: Array,
) -> Array:
    """Loss coefficient of one row of a plain bank after Zukauskas & Ulinskas 1988.

    Parameters
    ----------
    reynolds : Array
        Re in the narrowest section, on the tube diameter [-].
    transverse_pitch_ratio, longitudinal_pitch_ratio : Array
        a, b [-].
    arrangement : Array
        1 for staggered, 0 for in-line.
    rows : Array
        n [-]; counts in the slow range alone, where another law with its own count of resistances stands in.

    Returns
    -------
    Array
        xi (the Euler number of one row) in velocity heads of the narrowest section [-].

    Notes
    -----
    Eu/k as polynomials in 1/Re by range and pitch (HEDH 2.2.4, 1983; A. Zukauskas, R. Ulinskas, Heat Transfer
    in Tube Banks in Crossflow, Hemisphere 1988); in-line the set goes by b, staggered by a, and ln Eu is
    linear between the pitches 1.25, 1.5, 2, 2.5 and held outside. k is linear in log10 Re between the
    decades. Each polynomial is held at the ends of its own range, joins pass smoothly within a factor 1.4 in
    Re. Below a set's range ``gaddis-gnielinski-1985`` of a deep bank stands in, without wall factor.
    """
    a, b = transverse_pitch_ratio, longitudinal_pitch_ratio
    ln_re = log_reynolds(reynolds)
    bank = {"transverse_pitch_ratio": a, "longitudinal_pitch_ratio": b, "arrangement": arrangement}
    deep = gaddis_gnielinski_1985(reynolds=reynolds, rows=np.maximum(rows, 10.0), **bank)
    count = gaddis_gnielinski_1985_resistances(rows=rows, **bank) / rows
    ln_slow = np.log(deep * count)
    inline = _interpolated(ln_re, b, _INLINE, np.log(_layout_factor_inline(ln_re, a, b)), ln_slow)
    staggered = _interpolated(ln_re, a, _STAGGERED, np.log(_layout_factor_staggered(ln_re, a, b)), ln_slow)
    return np.exp(np.where(is_staggered(arrangement), staggered, inline))


def _inline_quotient(
    *, transverse_pitch_ratio: Array, longitudinal_pitch_ratio: Array, **_others: Array
) -> Array:
    return _layout_quotient(np.asarray(transverse_pitch_ratio), np.asarray(longitudinal_pitch_ratio))


def _staggered_quotient(
    *, transverse_pitch_ratio: Array, longitudinal_pitch_ratio: Array, **_others: Array
) -> Array:
    return np.asarray(transverse_pitch_ratio) / np.asarray(longitudinal_pitch_ratio)


def _lowest_reynolds(
    *, transverse_pitch_ratio: Array, longitudinal_pitch_ratio: Array, arrangement: Array, **_others: Array
) -> Array:
    """Lowest Reynolds number of the sets that the pitches lie between."""
    staggered = is_staggered(np.asarray(arrangement))
    pitch = np.where(staggered, transverse_pitch_ratio, longitudinal_pitch_ratio)
    inline_low = np.where(pitch <= 1.5, 3.0, np.where(pitch <= 2.0, 7.0, 600.0))
    staggered_low = np.where(pitch <= 1.5, 3.0, np.where(pitch <= 2.0, 7.0, 100.0))
    return np.where(staggered, staggered_low, inline_low)


def _reynolds_over_lowest(*, reynolds: Array, **others: Array) -> Array:
    return np.asarray(reynolds) / _lowest_reynolds(**others)


ZUKAUSKAS_ULINSKAS_1988 = Method(
    slug="zukauskas-ulinskas-1988",
    role="outside_pressure_drop",
    surfaces=("plain",),
    arrangements=("inline", "staggered"),
    gives="loss_coefficient",
    function=zukauskas_ulinskas_1988,
    inputs=INPUTS,
    limits=(
        Limit(quantity="reynolds", at_least=3.0, at_most=2e6),
        Limit(quantity="longitudinal_pitch_ratio", at_least=1.25, at_most=2.5, arrangement="inline"),
        Limit(quantity="transverse_pitch_ratio", at_least=1.25, at_most=2.5, arrangement="staggered"),
        Limit(quantity="rows", at_least=10.0),
    ),
    derived_limits=(
        DerivedLimit(
            name="Reynolds number over the least one the fits of these pitches reach down to",
            value=_reynolds_over_lowest,
            at_least=1.0,
        ),
        DerivedLimit(
            name="(a - 1)/(b - 1)", value=_inline_quotient, at_least=0.06, at_most=6.0, arrangement="inline"
        ),
        DerivedLimit(
            name="a/b", value=_staggered_quotient, at_least=0.45, at_most=3.5, arrangement="staggered"
        ),
    ),
    source=(
        "A. Zukauskas, R. Ulinskas, Heat Transfer in Tube Banks in Crossflow, Hemisphere 1988; fits of HEDH "
        "2.2.4, 1983"
    ),
    doubt=(
        "Fits recalled and held against the published charts: within 20 % from Re 3e3 to 1e5. In-line "
        "layout factor at Re 1e6: own fit to the chart. Staggered a = 1.25 above Re 1e3: a last constant of "
        "-5.59e12 circulates for -5.99e12."
    ),
    note=(
        "No wall factor and no row correction. Each fit is held at the ends of its range and joins pass "
        "smoothly within a factor 1.4 in Re. Below a set's range gaddis-gnielinski-1985 of a deep bank "
        "stands in."
    ),
    scatter_fraction=0.25,
    standard_uncertainty_fraction=0.12,
)

RECORDS = (ZUKAUSKAS_ULINSKAS_1988,)
