"""Plain tube banks, outside heat transfer: the power laws of Zukauskas 1987 and ESDU 73031."""

import numpy as np

from crossbank_service.methods import _rows
from crossbank_service.methods._blend import JOIN_FACTOR, elementwise, joined, log_reynolds, rise
from crossbank_service.methods._layout import is_staggered
from crossbank_service.methods.record import Array, DerivedLimit, Limit, Mask, Method

# Mean over n rows over the deep bank, ESDU 73031 (F2), 3 to 9 rows.
_ESDU_ROWS = (3.0, 4.0, 5.0, 6.0, 7.0, 8.0, 9.0, 10.0)
_ESDU_INLINE = (0.8479, 0.8957, 0.9306, 0.9551, 0.9724, 0.9839, 0.9902, 1.0)
_ESDU_STAGGERED = (0.8593, 0.8984, 0.9268, 0.9482, 0.965, 0.9777, 0.9868, 1.0)
# One and two rows have no ESDU data: the ratio C_N/C_3 of Zukauskas carries on from three.
_ESDU_ALL_ROWS = (1.0, 2.0, *_ESDU_ROWS)
_ESDU_ALL_INLINE = (0.8479 * 0.70 / 0.86, 0.8479 * 0.80 / 0.86, *_ESDU_INLINE)
_ESDU_ALL_STAGGERED = (0.8593 * 0.64 / 0.84, 0.8593 * 0.76 / 0.84, *_ESDU_STAGGERED)


def _power(ln_re: Array, coefficient: Array | float, exponent: float) -> Array:
    return np.log(coefficient) + exponent * ln_re


def _zukauskas_rows(rows: Array, ln_re: Array, staggered: Mask) -> Array:
    """Mean row factor; staggered, the two tables meet at Re 1000 as the correlation does."""
    slow = np.log(_rows.zukauskas_staggered_slow(rows))
    fast = np.log(_rows.zukauskas_staggered(rows))
    weight = rise(ln_re, 1e3 / JOIN_FACTOR, 1e3 * JOIN_FACTOR)
    return np.where(staggered, np.exp((1.0 - weight) * slow + weight * fast), _rows.zukauskas_inline(rows))


@elementwise
def zukauskas_1987(
    *,
    reynolds: Array,
    prandtl: Array,
    transverse_pitch_ratio: Array,
    longitudinal_pitch_ratio: Array,
    arrangement: Array,
    rows: Array,
    prandtl_wall: Array | None = None,
) -> Array:
    """Mean Nusselt number of a plain bank after Zukauskas 1987.

    Parameters
    ----------
    reynolds : Array
        Re in the narrowest section, on the tube diameter [-].
    prandtl : Array
        Pr of the bulk [-].
    transverse_pitch_ratio, longitudinal_pitch_ratio : Array
        a, b [-].
    arrangement : Array
        1 for staggered, 0 for in-line.
    rows : Array
        n [-].
    prandtl_wall : Array, optional
        Pr at the surface [-]; left out: no wall correction.

    Returns
    -------
    Array
        Nu on the tube diameter, mean over the rows [-].

    Notes
    -----
    Nu = c Re^m Pr^p (Pr/Pr_w)^0.25 C_N with c, m, p by range of Re (A. Zukauskas, Handbook of Single-Phase
    Convective Heat Transfer, 1987, ch. 6; the same set in Cengel & Ghajar, Heat and Mass Transfer, Table
    7-2). 10 < Re < 2e6, 0.7 < Pr < 500. (a/b)^0.2 of the staggered laws is held at a/b = 2, as the 1972 set's
    constant beyond it says. Joins are passed smoothly within a factor 1.4 in Re.
    """
    ln_re = log_reynolds(reynolds)
    ln_pr = np.log(prandtl)
    staggered = is_staggered(arrangement)
    ln_pitches = 0.2 * np.log(np.minimum(transverse_pitch_ratio / longitudinal_pitch_ratio, 2.0))
    inline_law = joined(
        ln_re,
        (
            _power(ln_re, 0.9, 0.4) + 0.36 * ln_pr,
            _power(ln_re, 0.52, 0.5) + 0.36 * ln_pr,
            _power(ln_re, 0.27, 0.63) + 0.36 * ln_pr,
            _power(ln_re, 0.033, 0.8) + 0.40 * ln_pr,
        ),
        (100.0, 1e3, 2e5),
    )
    staggered_law = 0.36 * ln_pr + joined(
        ln_re,
        (
            _power(ln_re, 1.04, 0.4),
            _power(ln_re, 0.71, 0.5),
            _power(ln_re, 0.35, 0.60) + ln_pitches,
            _power(ln_re, 0.031, 0.8) + ln_pitches,
        ),
        (500.0, 1e3, 2e5),
    )
    wall = 0.0 if prandtl_wall is None else 0.25 * (ln_pr - np.log(prandtl_wall))
    return np.exp(np.where(staggered, staggered_law, inline_law) + wall) * _zukauskas_rows(
        rows, ln_re, staggered
    )


@elementwise
def zukauskas_1987_row_share(
    *, row: Array, rows: Array, reynolds: Array, arrangement: Array, **_others: Array
) -> Array:
    """Local coefficient of a row over the bank's mean, from the differences of i C_i."""
    ln_re = log_reynolds(reynolds)
    staggered = is_staggered(arrangement)
    return _rows.share_of_row(
        row,
        _zukauskas_rows(row, ln_re, staggered),
        _zukauskas_rows(row - 1.0, ln_re, staggered),
        _zukauskas_rows(rows, ln_re, staggered),
    )


def _esdu_rows(rows: Array, staggered: Mask) -> Array:
    return np.where(
        staggered,
        np.interp(rows, _ESDU_ALL_ROWS, _ESDU_ALL_STAGGERED),
        np.interp(rows, _ESDU_ALL_ROWS, _ESDU_ALL_INLINE),
    )


@elementwise
def esdu_73031(
    *,
    reynolds: Array,
    prandtl: Array,
    arrangement: Array,
    rows: Array,
    prandtl_wall: Array | None = None,
) -> Array:
    """Mean Nusselt number of a plain bank after ESDU 73031.

    Parameters
    ----------
    reynolds : Array
        Re in the narrowest section, on the tube diameter [-].
    prandtl : Array
        Pr of the bulk [-].
    arrangement : Array
        1 for staggered, 0 for in-line.
    rows : Array
        n [-].
    prandtl_wall : Array, optional
        Pr at the surface [-]; left out: no wall correction.

    Returns
    -------
    Array
        Nu on the tube diameter, mean over the rows [-].

    Notes
    -----
    Nu = c Re^m Pr^0.34 F1 F2 with F1 = (Pr/Pr_w)^0.26 (ESDU 73031, 1973, in the form of Hewitt, Shires &
    Bott, Process Heat Transfer, 1994). 10 < Re < 2e6, pitches 1.2 to 4 in-line and 1 to 4 staggered across
    the flow; no effect of the pitches. F2 of one and two rows: F2(3) times the ratio C_N/C_3 of Zukauskas
    1987.
    """
    ln_re = log_reynolds(reynolds)
    ln_pr = np.log(prandtl)
    staggered = is_staggered(arrangement)
    joins = (300.0, 2e5)
    inline_law = joined(
        ln_re, (_power(ln_re, 0.742, 0.431), _power(ln_re, 0.211, 0.651), _power(ln_re, 0.116, 0.7)), joins
    )
    staggered_law = joined(
        ln_re, (_power(ln_re, 1.309, 0.360), _power(ln_re, 0.273, 0.635), _power(ln_re, 0.124, 0.7)), joins
    )
    wall = 0.0 if prandtl_wall is None else 0.26 * (ln_pr - np.log(prandtl_wall))
    law = np.exp(np.where(staggered, staggered_law, inline_law) + 0.34 * ln_pr + wall)
    return law * _esdu_rows(rows, staggered)


@elementwise
def esdu_73031_row_share(*, row: Array, rows: Array, arrangement: Array, **_others: Array) -> Array:
    """Local coefficient of a row over the bank's mean, from the differences of i F2_i."""
    staggered = is_staggered(arrangement)
    return _rows.share_of_row(
        row, _esdu_rows(row, staggered), _esdu_rows(row - 1.0, staggered), _esdu_rows(rows, staggered)
    )


def _pitch_quotient(
    *, transverse_pitch_ratio: Array, longitudinal_pitch_ratio: Array, **_others: Array
) -> Array:
    return np.asarray(transverse_pitch_ratio) / np.asarray(longitudinal_pitch_ratio)


INLINE_SPACING = DerivedLimit(
    name="transverse over longitudinal pitch in line",
    value=_pitch_quotient,
    at_least=0.7,
    arrangement="inline",
)

ZUKAUSKAS_1987 = Method(
    slug="zukauskas-1987",
    role="outside_heat_transfer",
    surfaces=("plain",),
    arrangements=("inline", "staggered"),
    gives="nusselt",
    function=zukauskas_1987,
    inputs=(
        "reynolds",
        "prandtl",
        "transverse_pitch_ratio",
        "longitudinal_pitch_ratio",
        "arrangement",
        "rows",
    ),
    options=("prandtl_wall",),
    limits=(
        Limit(quantity="reynolds", at_least=10.0, at_most=2e6),
        Limit(quantity="prandtl", at_least=0.65, at_most=500.0),
    ),
    derived_limits=(INLINE_SPACING,),
    source=(
        "A. Zukauskas, Convective heat transfer in cross flow, in Handbook of Single-Phase Convective Heat "
        "Transfer, Wiley 1987, ch. 6; constants as in Cengel & Ghajar, Heat and Mass Transfer, Table 7-2"
    ),
    doubt=(
        "Staggered above Re 2e5 other prints raise Pr to 0.40 in place of 0.36 (1.4 % for gases, 23 % at Pr "
        "200). In-line banks with a/b below 0.7 transfer poorly and are not covered."
    ),
    note=(
        "The published ranges jump at their joins; here they pass smoothly within a factor 1.4 in Re. Row "
        "factors: staggered below Re 1000 the table read from the 1972 figure, elsewhere the 1987 table, "
        "linear between rows; the staggered pitch term is held at a/b = 2. The least Prandtl number is "
        "printed as 0.7 and read to that digit (0.65), which takes in hot air."
    ),
    scatter_fraction=0.15,
    standard_uncertainty_fraction=0.08,
    row_share=zukauskas_1987_row_share,
)

ESDU_73031 = Method(
    slug="esdu-73031",
    role="outside_heat_transfer",
    surfaces=("plain",),
    arrangements=("inline", "staggered"),
    gives="nusselt",
    function=esdu_73031,
    inputs=("reynolds", "prandtl", "arrangement", "rows"),
    options=("prandtl_wall",),
    limits=(
        Limit(quantity="reynolds", at_least=10.0, at_most=2e6),
        Limit(quantity="transverse_pitch_ratio", at_least=1.2, at_most=4.0, arrangement="inline"),
        Limit(quantity="transverse_pitch_ratio", at_least=1.0, at_most=4.0, arrangement="staggered"),
        Limit(quantity="rows", at_least=3.0),
    ),
    source="ESDU 73031, 1973, in the form of Hewitt, Shires & Bott, Process Heat Transfer, CRC Press 1994",
    doubt="No row factor is published for one and two rows.",
    note=(
        "One and two rows: the three-row factor times the ratio of the Zukauskas 1987 row factors. The "
        "ranges differ by less than 1 % at their joins and pass smoothly within a factor 1.4 in Re."
    ),
    scatter_fraction=0.15,
    standard_uncertainty_fraction=0.08,
    row_share=esdu_73031_row_share,
)

RECORDS = (ZUKAUSKAS_1987, ESDU_73031)
