"""Exact effectiveness of a tube bank of any rows and passes, constant coefficients.

The model: tube fluid mixed over each tube's section, gas unmixed along the tubes, so that every filament of
gas meets the rows one after another at one place x along the tubes. The tube temperatures then obey linear
equations in x with constant coefficients; passes tie outlets to inlets.

What is solved for is not the tube temperature t (1 at the tube inlet, gas inlet 0) but its fall over the
capacity ratio, u = (1 - t)/C. Its equations hold at C = 0 as they stand and P is the mean u of the last
outlets, a sum of positive terms: no digits are lost at small C. Rows whose fluid runs the other way make the
plain exponential of the system grow without bound; instead the response of a short piece of the bank (outlets
from inlets) is formed and doubled. Responses are positive and at most one, at any NTU and C.
"""

from dataclasses import dataclass
from itertools import pairwise
from typing import Literal

import numpy as np
from numpy.typing import NDArray

from crossbank_service.methods._numeric import Value
from crossbank_service.methods.record import Array

_PIECE = 0.5
"""Greatest rate of change over the first short piece, where the series below is exact to rounding."""
_SERIES_TERMS = 16
_MOST_DOUBLINGS = 60
_GREATEST_CAPACITY_RATIO = 1e12
_BLOCK_NUMBERS = 100_000
"""Numbers in one matrix stack: large screens go through in blocks that stay in the processor's cache."""

Connection = Literal["mixed", "matching", "nested"]


@dataclass(frozen=True)
class Circuit:
    """How the tube fluid runs through the rows.

    Attributes
    ----------
    rows_per_pass : tuple of int
        Rows of each pass in the order of the tube flow; the rows of a pass lie side by side in the gas
        stream and share the tube flow equally.
    counter : bool
        True: the first pass holds the last rows met by the gas (counter-cross); false: the first rows.
    connection : str
        ``mixed``: fluid is mixed between passes. ``matching``: each row feeds the row of the next pass at
        the same place (with two passes of two rows against the gas 4 to 2, 3 to 1). ``nested``: the rows of
        the next pass in reversed order (4 to 1, 3 to 2). The last two need passes of equal rows.
    alternate : bool
        True: every pass runs along the tubes against the one before; false: all run the same way.
    row_shares : tuple of float or None
        Share of UA of each row in the order met by the gas, any positive scale; None: equal.
    """

    rows_per_pass: tuple[int, ...]
    counter: bool = True
    connection: Connection = "mixed"
    alternate: bool = True
    row_shares: tuple[float, ...] | None = None

    def __post_init__(self) -> None:
        if not self.rows_per_pass or min(self.rows_per_pass) < 1:
            raise ValueError(f"rows_per_pass {self.rows_per_pass}: every pass needs at least one row")
        if self.connection != "mixed" and len(set(self.rows_per_pass)) > 1:
            raise ValueError(
                f"connection {self.connection} joins row to row: "
                f"rows_per_pass {self.rows_per_pass} must be equal"
            )
        if self.row_shares is not None and len(self.row_shares) != self.rows:
            raise ValueError(f"row_shares has {len(self.row_shares)} entries for {self.rows} rows")
        if self.row_shares is not None and not min(self.row_shares) > 0.0:
            raise ValueError(f"row_shares {self.row_shares}: every row needs a positive share")

    @property
    def rows(self) -> int:
        """Rows in the gas stream."""
        return sum(self.rows_per_pass)

    def pass_rows(self) -> tuple[tuple[int, ...], ...]:
        """Rows of each pass in tube order, counted from 0 at the gas inlet, in gas order within a pass."""
        starts = np.concatenate(([0], np.cumsum(self.rows_per_pass)))
        blocks = tuple(tuple(range(int(a), int(b))) for a, b in pairwise(starts))
        if not self.counter:
            return blocks
        last = self.rows - 1
        return tuple(tuple(sorted(last - row for row in block)) for block in blocks)

    def links(self) -> NDArray[np.float64]:
        """Matrix W of inlet = W outlet: rows times rows, zero for the first pass."""
        weights = np.zeros((self.rows, self.rows))
        passes = self.pass_rows()
        for before, after in pairwise(passes):
            if self.connection == "mixed":
                weights[np.ix_(after, before)] = 1.0 / len(before)
            else:
                sources = before if self.connection == "matching" else before[::-1]
                weights[after, sources] = 1.0
        return weights


def even_passes(rows: int, passes: int) -> tuple[int, ...]:
    """Rows of each pass, as even as whole rows allow, the larger passes first.

    Parameters
    ----------
    rows, passes : int
        Rows and passes; passes at most rows.

    Returns
    -------
    tuple of int
        Rows per pass in tube order.
    """
    if not 1 <= passes <= rows:
        raise ValueError(f"passes {passes}: between 1 and the number of rows, {rows}")
    least, more = divmod(rows, passes)
    return tuple(least + 1 if index < more else least for index in range(passes))


def circuit_effectiveness(ntu: Value, capacity_ratio: Value, circuit: Circuit) -> Array:
    """P of a bank with one circuit, exact.

    Parameters
    ----------
    ntu, capacity_ratio : array
        UA/C_gas and C_gas/C_tube [-], broadcast together; the circuit is one for all of them.
    circuit : Circuit
        Rows, passes and how they are joined.

    Returns
    -------
    array
        P [-], of the broadcast shape.

    Notes
    -----
    With K_r = 1 - e^(-NTU_r) and the share phi_r of the tube flow in row r,
    dir_r dt_r/dx = (C/phi_r) K_r (T_r - t_r), T_(r+1) = (1 - K_r) T_r + K_r t_r, T_1 = 0, first inlets 1
    (Schedwill 1968; Pignotti and Cordero, J. Heat Transfer 105 (1983) 584-591). Solved by doubling the
    response of a short piece (Redheffer 1962), no approximation but rounding.
    """
    n, c = np.broadcast_arrays(
        np.asarray(ntu, dtype=np.float64), np.asarray(capacity_ratio, dtype=np.float64)
    )
    flat_n, flat_c = n.reshape(-1), c.reshape(-1)
    block = max(1, _BLOCK_NUMBERS // circuit.rows**2)
    parts = [
        _solve(flat_n[start : start + block], flat_c[start : start + block], circuit)
        for start in range(0, flat_n.size, block)
    ]
    return np.concatenate(parts).reshape(n.shape) if parts else np.zeros(n.shape)


def _solve(ntu: Array, capacity_ratio: Array, circuit: Circuit) -> Array:
    rows = circuit.rows
    shares = np.ones(rows) if circuit.row_shares is None else np.asarray(circuit.row_shares)
    passes = circuit.pass_rows()
    flow_share = np.empty(rows)
    direction = np.empty(rows)
    for index, block in enumerate(passes):
        flow_share[list(block)] = 1.0 / len(block)
        direction[list(block)] = -1.0 if circuit.alternate and index % 2 else 1.0

    c = np.minimum(capacity_ratio, _GREATEST_CAPACITY_RATIO)[:, None]
    ntu_row = ntu[:, None] * (shares / shares.sum())
    gain = -np.expm1(-ntu_row)
    # share of the gas inlet's temperature that is left before each row
    before = np.exp(-(np.cumsum(ntu_row, axis=1) - ntu_row))
    rate = gain / flow_share
    source = rate * before
    matrix = _coupling(ntu_row, gain, rate) * c[:, :, None]

    response, offset = _bank_response(matrix, source, direction)
    links = circuit.links()
    system = np.eye(rows) - _linked(links, response)
    inlets = np.linalg.solve(system, _linked(links, offset)[:, :, None])
    outlets = np.matmul(response, inlets)[:, :, 0] + offset
    p = np.zeros(ntu.shape)
    for row in passes[-1]:
        p = p + outlets[:, row] * flow_share[row]
    return p


def _coupling(ntu_row: Array, gain: Array, rate: Array) -> Array:
    """Matrix B of dir u' = source - C B' u: what a row gives off and takes from the rows before it."""
    cases, rows = ntu_row.shape
    matrix = np.zeros((cases, rows, rows))
    for r in range(rows):
        matrix[:, r, r] = -rate[:, r]
        passed = np.zeros(cases)
        for s in range(r - 1, -1, -1):
            matrix[:, r, s] = rate[:, r] * gain[:, s] * np.exp(-passed)
            passed = passed + ntu_row[:, s]
    return matrix


def _linked(links: NDArray[np.float64], outlets: Array) -> Array:
    """Inlets from outlets, links on the second axis; summed in an order that no stack size changes."""
    inlets = np.zeros_like(outlets)
    for row, source in zip(*np.nonzero(links), strict=True):
        inlets[:, row] += links[row, source] * outlets[:, source]
    return inlets


def _bank_response(matrix: Array, source: Array, direction: NDArray[np.float64]) -> tuple[Array, Array]:
    """Outlets from inlets over the whole tube length: outlet = S inlet + b, rows in gas order."""
    order = np.argsort(-direction, kind="stable")
    forward = int((direction > 0.0).sum())
    steepest = np.abs(matrix).sum(axis=2).max(axis=1)
    _, exponent = np.frexp(steepest / _PIECE)
    doublings = np.clip(exponent, 0, _MOST_DOUBLINGS)
    length = np.ldexp(1.0, -doublings)

    # one memory layout whatever the number of cases: products choose their kernel by it
    signed = np.ascontiguousarray(
        (direction[:, None] * matrix)[:, order[:, None], order[None, :]] * length[:, None, None]
    )
    pushed = np.ascontiguousarray((direction * source)[:, order] * length[:, None])
    response, offset = _short_piece(signed, pushed, forward)
    for step in range(int(doublings.max(initial=0))):
        active = np.flatnonzero(doublings > step)
        response[active], offset[active] = _doubled(response[active], offset[active], forward)

    back = np.argsort(order, kind="stable")
    return (
        np.ascontiguousarray(response[:, back[:, None], back[None, :]]),
        np.ascontiguousarray(offset[:, back]),
    )


def _short_piece(matrix: Array, source: Array, forward: int) -> tuple[Array, Array]:
    """Response of a piece short enough for the exponential series; forward rows stand first."""
    rows = matrix.shape[1]
    term, push = matrix, source[:, :, None]
    transfer, forced = np.eye(rows) + term, push
    for k in range(2, _SERIES_TERMS + 1):
        push = np.matmul(matrix, push) / k
        forced = forced + push
        term = np.matmul(matrix, term) / k
        transfer = transfer + term
    driven = forced[:, :, 0]
    if forward == rows:
        return transfer, driven

    f, g = slice(0, forward), slice(forward, rows)
    # the rows that run back: their outlet is at the start of the piece, their inlet at its end
    from_forward = -transfer[:, g, f]
    inverse = np.linalg.inv(transfer[:, g, g])
    back_forward = np.matmul(inverse, from_forward)
    back_offset = -np.matmul(inverse, driven[:, g, None])[:, :, 0]
    response = np.empty_like(transfer)
    response[:, g, f] = back_forward
    response[:, g, g] = inverse
    response[:, f, f] = transfer[:, f, f] + np.matmul(transfer[:, f, g], back_forward)
    response[:, f, g] = np.matmul(transfer[:, f, g], inverse)
    offset = np.empty_like(driven)
    offset[:, g] = back_offset
    offset[:, f] = driven[:, f] + np.matmul(transfer[:, f, g], back_offset[:, :, None])[:, :, 0]
    return response, offset


def _doubled(response: Array, offset: Array, forward: int) -> tuple[Array, Array]:
    """Response of two like pieces in series."""
    rows = response.shape[1]
    f, g = slice(0, forward), slice(forward, rows)
    if forward == rows:
        return np.matmul(response, response), np.matmul(response, offset[:, :, None])[:, :, 0] + offset
    sff, sfg, sgf, sgg = response[:, f, f], response[:, f, g], response[:, g, f], response[:, g, g]
    bf, bg = offset[:, f, None], offset[:, g, None]
    # at the joint: forward m = sff p + sfg n + bf, backward n = sgf m + sgg q + bg
    joint = np.linalg.inv(np.eye(forward) - np.matmul(sfg, sgf))
    m_p = np.matmul(joint, sff)
    m_q = np.matmul(joint, np.matmul(sfg, sgg))
    m_b = np.matmul(joint, np.matmul(sfg, bg) + bf)
    n_p = np.matmul(sgf, m_p)
    n_q = np.matmul(sgf, m_q) + sgg
    n_b = np.matmul(sgf, m_b) + bg
    doubled, moved = np.empty_like(response), np.empty_like(offset)
    doubled[:, f, f] = np.matmul(sff, m_p)
    doubled[:, f, g] = np.matmul(sff, m_q) + sfg
    doubled[:, g, f] = sgf + np.matmul(sgg, n_p)
    doubled[:, g, g] = np.matmul(sgg, n_q)
    moved[:, f] = (np.matmul(sff, m_b) + bf)[:, :, 0]
    moved[:, g] = (np.matmul(sgg, n_b) + bg)[:, :, 0]
    return doubled, moved
