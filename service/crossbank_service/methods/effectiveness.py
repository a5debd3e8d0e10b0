"""Effectiveness of crossflow arrangements with constant coefficients, seen from the outside stream.

Everything is written on the outside (gas) side: ntu = UA/C_gas, capacity_ratio C = C_gas/C_tube (may
exceed 1) and P = (T_gas,out - T_gas,in)/(T_tube,in - T_gas,in), so that the duty is
C_gas P (T_tube,in - T_gas,in) and no formula needs to know which stream is the smaller. C = 0 is a tube fluid
at constant temperature.

The general bank, any rows and passes, is in ``effectiveness_rows`` and reached through ``effectiveness``.
"""

from collections.abc import Callable

import numpy as np
from numpy.typing import NDArray
from scipy.special import gammainc

from crossbank_service.methods._numeric import Value, bracketed_root
from crossbank_service.methods.effectiveness_rows import (
    Circuit,
    Connection,
    circuit_effectiveness,
    even_passes,
)
from crossbank_service.methods.record import Array

__all__ = [
    "Circuit",
    "cell",
    "circuit_effectiveness",
    "cocurrent",
    "condensing",
    "counterflow",
    "counterflow_ntu",
    "effectiveness",
    "even_passes",
    "gas_mixed",
    "mixed_passes",
    "ntu_for",
    "one_row",
    "passes_over_face",
    "unmixed",
]

GREATEST_NTU = 1e4
"""End of the search for an NTU."""
_WIDENINGS = 90
_UNMIXED_SPAN = 2000.0


def _relative_rise(x: Value) -> Array:
    """(1 - e^-x)/x, 1 at x = 0."""
    x = np.asarray(x, dtype=np.float64)
    zero = x == 0.0
    rise: Array = np.where(zero, 1.0, -np.expm1(-x) / np.where(zero, 1.0, x))
    return rise


def condensing(ntu: Value) -> Array:
    """P against a tube fluid at constant temperature, any rows and passes.

    Parameters
    ----------
    ntu : array
        UA/C_gas [-].

    Returns
    -------
    array
        P = 1 - e^-NTU [-].
    """
    p: Array = -np.expm1(-np.asarray(ntu, dtype=np.float64))
    return p


def counterflow(ntu: Value, capacity_ratio: Value) -> Array:
    """P in counterflow.

    Parameters
    ----------
    ntu, capacity_ratio : array
        UA/C_gas and C_gas/C_tube [-].

    Returns
    -------
    array
        P [-].

    Notes
    -----
    P = (1 - e^(-NTU (1 - C)))/(1 - C e^(-NTU (1 - C))), NTU/(1 + NTU) at C = 1 (Kays and London 1964), here
    with g = (1 - e^-d)/d, d = NTU |1 - C| as NTU g/(1 + min(C, 1) NTU g): no digits lost near C = 1.
    """
    n = np.asarray(ntu, dtype=np.float64)
    c = np.asarray(capacity_ratio, dtype=np.float64)
    transfer = n * _relative_rise(n * np.abs(1.0 - c))
    p: Array = transfer / (1.0 + np.minimum(c, 1.0) * transfer)
    return p


def counterflow_ntu(p: Value, capacity_ratio: Value) -> Array:
    """NTU that counterflow needs for P, the inverse of ``counterflow``.

    Parameters
    ----------
    p, capacity_ratio : array
        P and C [-]; P below 1 and below 1/C (at or beyond, a large finite NTU).

    Returns
    -------
    array
        NTU [-]; over the NTU of the bank it is the log-mean correction factor F.

    Notes
    -----
    NTU = ln[(1 - P C)/(1 - P)]/(1 - C), P/(1 - P) at C = 1.
    """
    p = np.asarray(p, dtype=np.float64)
    c = np.asarray(capacity_ratio, dtype=np.float64)
    odds = p / np.maximum(1.0 - p, 1e-150)
    y = np.maximum(odds * (1.0 - c), -1.0 + 1e-16)
    small = np.abs(y) < 1e-8
    n: Array = odds * np.where(small, 1.0 - 0.5 * y, np.log1p(y) / np.where(small, 1.0, y))
    return n


def cocurrent(ntu: Value, capacity_ratio: Value) -> Array:
    """P in cocurrent flow.

    Parameters
    ----------
    ntu, capacity_ratio : array
        UA/C_gas and C_gas/C_tube [-].

    Returns
    -------
    array
        P = (1 - e^(-NTU (1 + C)))/(1 + C) [-].
    """
    total = 1.0 + np.asarray(capacity_ratio, dtype=np.float64)
    p: Array = -np.expm1(-ntu * total) / total
    return p


def one_row(ntu: Value, capacity_ratio: Value) -> Array:
    """P of one row: tube fluid mixed over its section, gas unmixed.

    Parameters
    ----------
    ntu, capacity_ratio : array
        UA/C_gas and C_gas/C_tube [-].

    Returns
    -------
    array
        P = [1 - exp(-C (1 - e^-NTU))]/C [-].
    """
    gain = condensing(ntu)
    p: Array = gain * _relative_rise(gain * capacity_ratio)
    return p


def gas_mixed(ntu: Value, capacity_ratio: Value) -> Array:
    """P in crossflow with the gas mixed and the tube fluid unmixed.

    Parameters
    ----------
    ntu, capacity_ratio : array
        UA/C_gas and C_gas/C_tube [-].

    Returns
    -------
    array
        P = 1 - exp(-(1 - e^(-C NTU))/C) [-].
    """
    n = np.asarray(ntu, dtype=np.float64)
    p: Array = -np.expm1(-n * _relative_rise(n * capacity_ratio))
    return p


def unmixed(ntu: Value, capacity_ratio: Value) -> Array:
    """P in crossflow with both fluids unmixed, the limit of one pass with endless rows.

    Parameters
    ----------
    ntu, capacity_ratio : array
        UA/C_gas and C_gas/C_tube [-].

    Returns
    -------
    array
        P [-].

    Notes
    -----
    P = 1/(C NTU) sum over n of Q_n(NTU) Q_n(C NTU), Q_n(x) = 1 - e^-x (sum of x^m/m! to n) (Mason 1954), the
    regularised incomplete gamma function. Each case stops at its own last term. Where both NTU and C NTU
    exceed 2000 they are scaled back to it, which is within 1.3 % of the limit.
    """
    n, c = np.broadcast_arrays(
        np.asarray(ntu, dtype=np.float64), np.asarray(capacity_ratio, dtype=np.float64)
    )
    n = n / np.maximum(1.0, np.minimum(n, n * c) / _UNMIXED_SPAN)
    x = n * c
    p = np.array(condensing(n) * _relative_rise(x), dtype=np.float64)
    running = (x > 0.0) & (n > 0.0)
    term_number = 0
    while running.any():
        term_number += 1
        term = gammainc(term_number + 1.0, n) * gammainc(term_number + 1.0, x) / np.where(running, x, 1.0)
        p = np.where(running, p + term, p)
        running &= (term_number < np.minimum(n, x)) | (term > 1e-17 * p)
    return p


def mixed_passes(p: Value, capacity_ratio: Value, passes: int, *, counter: bool) -> Array:
    """P of like passes with both fluids mixed between them.

    Parameters
    ----------
    p, capacity_ratio : array
        P of one pass at its own NTU, and C [-].
    passes : int
        Number of passes.
    counter : bool
        True: the streams meet the passes in opposite order; false: in the same order.

    Returns
    -------
    array
        P of all [-].

    Notes
    -----
    Counter: r = [(1 - p C)/(1 - p)]^n, P = (r - 1)/(r - C); co: P = [1 - (1 - p (1 + C))^n]/(1 + C) (Kays
    and London 1964). In counter passes the NTU of the equivalent counterflow adds up; so it is computed.
    """
    if counter:
        return counterflow(passes * counterflow_ntu(p, capacity_ratio), capacity_ratio)
    total = 1.0 + np.asarray(capacity_ratio, dtype=np.float64)
    combined: Array = (1.0 - (1.0 - p * total) ** passes) / total
    return combined


def effectiveness(
    ntu: Value,
    capacity_ratio: Value,
    *,
    rows: int,
    passes: int | tuple[int, ...] = 1,
    counter: bool = True,
    connection: Connection = "mixed",
    alternate: bool = True,
    row_shares: tuple[float, ...] | None = None,
) -> Array:
    """P of a tube bank of any rows and passes, exact for constant coefficients.

    Parameters
    ----------
    ntu, capacity_ratio : array
        UA/C_gas and C_gas/C_tube of the bank [-], broadcast together.
    rows : int
        Rows in the gas stream.
    passes : int or tuple of int
        Passes of even rows (the first ones take what is left over), or the rows of each in tube order.
    counter : bool
        True: first pass in the last rows (counter-cross); false: in the first rows (co-cross).
    connection, alternate, row_shares
        As in ``Circuit``.

    Returns
    -------
    array
        P [-].

    Examples
    --------
    >>> round(float(effectiveness(2.0, 0.5, rows=4, passes=2)), 6)
    0.75624
    """
    rows_per_pass = even_passes(rows, passes) if isinstance(passes, int) else passes
    if sum(rows_per_pass) != rows:
        raise ValueError(f"rows_per_pass {rows_per_pass}: must add up to the {rows} rows")
    circuit = Circuit(rows_per_pass, counter, connection, alternate, row_shares)
    return circuit_effectiveness(ntu, capacity_ratio, circuit)


def passes_over_face(ntu: Value, capacity_ratio: Value, circuit: Circuit, passes: int) -> Array:
    """P of passes that lie side by side over the face, gas in parallel and tube fluid in series.

    Parameters
    ----------
    ntu, capacity_ratio : array
        UA/C_gas and C_gas/C_tube of the whole bank [-].
    circuit : Circuit
        The rows within each pass.
    passes : int
        Equal parts of the face that the tube fluid runs through one after another, mixed between.

    Returns
    -------
    array
        P of the mixed gas [-].

    Notes
    -----
    Each part has the NTU of the bank and C/passes; P = [1 - (1 - p C/passes)^passes]/C, summed as a series.
    """
    part_ratio = np.asarray(capacity_ratio, dtype=np.float64) / passes
    p = circuit_effectiveness(ntu, part_ratio, circuit)
    kept = 1.0 - p * part_ratio
    total, share = np.zeros_like(kept), np.ones_like(kept)
    for _ in range(passes):
        total = total + share
        share = share * kept
    return p * total / passes


def cell(ntu: Value, capacity_ratio: Value) -> tuple[Array, Array]:
    """Gas gain and tube-side damping of one cell: gas unmixed, tube fluid mixed over its section.

    Parameters
    ----------
    ntu : array
        UA of the cell over the gas capacity rate through it [-].
    capacity_ratio : array
        Gas capacity rate through the cell over that of the tube fluid in it [-]; 0 at constant temperature.

    Returns
    -------
    tuple of array
        k = 1 - e^-NTU and e = (1 - e^-a)/a with a = C k: duty = C_gas k e (T_tube,in - T_gas,in).
    """
    k = condensing(ntu)
    return k, _relative_rise(k * capacity_ratio)


def ntu_for(
    p: Value, capacity_ratio: Value, relation: Callable[[Array, Array], Array]
) -> tuple[Array, NDArray[np.bool_]]:
    """Least NTU that reaches P in an arrangement.

    Parameters
    ----------
    p, capacity_ratio : array
        Wanted P, 0 to 1, and C [-].
    relation : callable
        P of arrays NTU and C, such as ``one_row`` or a closure over ``circuit_effectiveness``.

    Returns
    -------
    tuple of array
        NTU [-], and whether P is reached at all. Where it is not, NTU is the largest that was tried.

    Notes
    -----
    No arrangement beats the condensing one, so the search starts at -ln(1 - P) and widens by half until P is
    passed (the first passage, where cocurrent banks fall again), then brackets.
    """
    wanted, c = (
        np.array(x, dtype=np.float64)
        for x in np.broadcast_arrays(np.asarray(p, np.float64), np.asarray(capacity_ratio, np.float64))
    )
    low = -np.log1p(-np.clip(wanted, 0.0, 1.0 - 1e-16))
    high = low.copy()
    reached = relation(high, c) >= wanted
    for _ in range(_WIDENINGS):
        if reached.all():
            break
        low = np.where(reached, low, high)
        high = np.where(reached, high, np.minimum(1.5 * high, GREATEST_NTU))
        reached |= relation(high, c) >= wanted
    found = bracketed_root(lambda n: relation(n, c) - wanted, low, np.where(reached, high, low))
    return np.where(reached, found, high), reached
