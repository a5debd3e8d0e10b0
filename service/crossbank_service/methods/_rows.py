"""Row factors of banks: the mean over n rows, and what it says of a single row."""

import numpy as np

from crossbank_service.methods.record import Array

# Zukauskas 1987: mean over n rows over the deep bank, Re > 1000.
_ZUKAUSKAS_ROWS = (1.0, 2.0, 3.0, 4.0, 5.0, 7.0, 10.0, 13.0, 16.0, 20.0)
_ZUKAUSKAS_INLINE = (0.70, 0.80, 0.86, 0.90, 0.92, 0.95, 0.97, 0.98, 0.99, 1.0)
_ZUKAUSKAS_STAGGERED = (0.64, 0.76, 0.84, 0.89, 0.92, 0.95, 0.97, 0.98, 0.99, 1.0)
# Staggered, Re < 1000, read from the 1972 figure for 1..8 rows; straight to 1 at 20 rows.
_ZUKAUSKAS_SLOW_ROWS = (1.0, 2.0, 3.0, 4.0, 5.0, 6.0, 7.0, 8.0, 20.0)
_ZUKAUSKAS_SLOW = (0.83, 0.88, 0.915, 0.94, 0.957, 0.968, 0.975, 0.979, 1.0)


def zukauskas_inline(rows: Array) -> Array:
    """Mean row factor C_N of in-line banks, Zukauskas 1987, linear between the printed rows."""
    return np.interp(rows, _ZUKAUSKAS_ROWS, _ZUKAUSKAS_INLINE)


def zukauskas_staggered(rows: Array) -> Array:
    """Mean row factor C_N of staggered banks at Re > 1000, Zukauskas 1987, linear between rows."""
    return np.interp(rows, _ZUKAUSKAS_ROWS, _ZUKAUSKAS_STAGGERED)


def zukauskas_staggered_slow(rows: Array) -> Array:
    """Mean row factor C_N of staggered banks at Re < 1000, Zukauskas 1972."""
    return np.interp(rows, _ZUKAUSKAS_SLOW_ROWS, _ZUKAUSKAS_SLOW)


def share_of_row(row: Array, mean_to_row: Array, mean_before: Array, mean_of_bank: Array) -> Array:
    """Local coefficient of a row over the bank's mean from mean row factors C.

    Parameters
    ----------
    row : Array
        Row i [-], 1 at the inlet.
    mean_to_row, mean_before, mean_of_bank : Array
        C_i, C_(i-1) and C_n [-]. C_0 may be any finite number.

    Returns
    -------
    Array
        (i C_i - (i - 1) C_(i-1))/C_n; its mean over the rows is 1, since the sum telescopes.
    """
    return (row * mean_to_row - (row - 1.0) * mean_before) / mean_of_bank
