"""Effectiveness relations: closed forms, tables, an independent library and limits."""

from collections.abc import Callable
from math import comb, exp, expm1, factorial

import ht
import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from numpy.typing import NDArray
from scipy.integrate import solve_bvp

from crossbank_service.methods.effectiveness import (
    Circuit,
    cell,
    circuit_effectiveness,
    cocurrent,
    condensing,
    counterflow,
    counterflow_ntu,
    effectiveness,
    even_passes,
    gas_mixed,
    mixed_passes,
    ntu_for,
    one_row,
    passes_over_face,
    unmixed,
)

Floats = NDArray[np.float64]

_NTU = np.array([1.0, 2.0, 2.0, 4.0])
_RATIO = np.array([0.5, 0.5, 1.0, 0.25])

# both fluids unmixed: Mason's series at high precision, six decimals, C 0.25, 0.5, 0.75, 1
_UNMIXED = {
    0.5: (0.375094, 0.357827, 0.341595, 0.326330),
    1.0: (0.588011, 0.547490, 0.510309, 0.476222),
    2.0: (0.797422, 0.732409, 0.671080, 0.614247),
    4.0: (0.934020, 0.869687, 0.796884, 0.722426),
}

# counter-cross, mixed between passes, at (NTU, C) = (1, .5), (2, .5), (2, 1), (4, .25): row equations solved
# by a program of its own
_COUNTER_CROSS = {
    (1, 1): (0.541969, 0.702013, 0.578807, 0.870500),
    (2, 1): (0.546118, 0.724712, 0.604685, 0.918809),
    (3, 1): (0.546881, 0.728985, 0.609938, 0.927437),
    (4, 1): (0.547148, 0.730483, 0.611812, 0.930358),
    (6, 1): (0.547338, 0.731553, 0.613161, 0.932406),
    (2, 2): (0.558315, 0.752307, 0.634701, 0.939606),
    (3, 3): (0.561883, 0.764606, 0.651424, 0.953004),
    (4, 2): (0.558905, 0.756240, 0.640193, 0.947461),
    (4, 4): (0.563112, 0.768887, 0.657768, 0.957151),
    (6, 2): (0.559014, 0.756959, 0.641215, 0.948804),
    (6, 3): (0.562061, 0.765830, 0.653266, 0.955252),
    (6, 6): (0.564011, 0.772051, 0.662625, 0.960011),
    (8, 2): (0.559052, 0.757211, 0.641574, 0.949266),
    (8, 4): (0.563188, 0.769415, 0.658584, 0.958084),
}


@pytest.mark.parametrize(("rows", "passes"), list(_COUNTER_CROSS))
def test_counter_cross_table(rows: int, passes: int) -> None:
    """Counter-cross banks agree with the table to its six decimals."""
    p = effectiveness(_NTU, _RATIO, rows=rows, passes=passes)
    np.testing.assert_allclose(p, _COUNTER_CROSS[rows, passes], rtol=0.0, atol=5.1e-7)


@pytest.mark.parametrize(
    ("rows", "passes", "expected"),
    [
        (2, 2, 0.640901),
        (3, 3, 0.637384),
        (4, 2, 0.642615),
        (4, 4, 0.635518),
        (6, 3, 0.637850),
        (6, 6, 0.634392),
    ],
)
def test_co_cross_table(rows: int, passes: int, expected: float) -> None:
    """Co-cross banks at NTU 2 and C 0.5 agree with the table to its six decimals."""
    p = float(effectiveness(2.0, 0.5, rows=rows, passes=passes, counter=False))
    assert p == pytest.approx(expected, abs=5.1e-7)


def test_gas_may_be_the_larger_stream() -> None:
    """C above 1 needs no other formula: 4 rows, 4 passes, NTU 1.5, C 1.8."""
    assert float(effectiveness(1.5, 1.8, rows=4, passes=4)) == pytest.approx(0.461108, abs=5.1e-7)


@pytest.mark.parametrize("ntu", list(_UNMIXED))
def test_unmixed_table(ntu: float) -> None:
    """Both fluids unmixed agree with the table to its six decimals."""
    p = unmixed(ntu, np.array([0.25, 0.5, 0.75, 1.0]))
    np.testing.assert_allclose(p, _UNMIXED[ntu], rtol=0.0, atol=5.1e-7)


def test_mixed_streams_by_hand() -> None:
    """One stream mixed at NTU 2: tube mixed and gas mixed, six decimals of the closed forms."""
    ratio = np.array([0.25, 0.5, 0.75, 1.0])
    np.testing.assert_allclose(one_row(2.0, ratio), [0.777594, 0.702013, 0.636226, 0.578807], atol=5.1e-7)
    np.testing.assert_allclose(gas_mixed(2.0, ratio), [0.792760, 0.717546, 0.645067, 0.578807], atol=5.1e-7)


def test_two_mixed_passes() -> None:
    """Two passes of unmixed crossflow, NTU 1 each, C 0.5: counter 0.759136, co 0.645362."""
    p = unmixed(1.0, 0.5)
    assert float(mixed_passes(p, 0.5, 2, counter=True)) == pytest.approx(0.759136, abs=5.1e-7)
    assert float(mixed_passes(p, 0.5, 2, counter=False)) == pytest.approx(0.645362, abs=5.1e-7)


@pytest.mark.parametrize("ntu", [0.3, 2.0, 7.0])
@pytest.mark.parametrize("ratio", [0.1, 0.6, 1.0])
def test_basic_relations_agree_with_a_public_library(ntu: float, ratio: float) -> None:
    """`ht` gives the same values for the streams' basic arrangements (gas the smaller stream)."""
    library: Callable[..., float] = ht.effectiveness_from_NTU
    for relation, subtype in (
        (unmixed, "crossflow"),
        (one_row, "crossflow, mixed Cmax"),
        (gas_mixed, "crossflow, mixed Cmin"),
        (counterflow, "counterflow"),
        (cocurrent, "parallel"),
    ):
        expected = library(ntu, ratio, subtype=subtype)
        assert float(relation(ntu, ratio)) == pytest.approx(expected, rel=1e-9)


@pytest.mark.parametrize(("rows", "passes"), [(1, 1), (2, 1), (3, 1), (4, 1), (2, 2), (3, 3), (4, 2), (5, 5)])
@pytest.mark.parametrize(("ntu", "ratio"), [(0.7, 0.4), (2.5, 0.9), (4.0, 0.2)])
def test_banks_agree_with_a_public_library(rows: int, passes: int, ntu: float, ratio: float) -> None:
    """`ht` gives the same values for the rows and passes whose forms it has right."""
    expected = ht.temperature_effectiveness_air_cooler(ratio, ntu, rows=rows, passes=passes, coerce=False)
    assert float(effectiveness(ntu, ratio, rows=rows, passes=passes)) == pytest.approx(expected, rel=1e-9)


def _parallel_rows(ntu: float, ratio: float, rows: int) -> float:
    """One pass of any rows, closed double sum (ESDU 86018)."""
    n = ntu / rows
    gain = -expm1(-n)
    z = rows * gain * ratio
    total = 0.0
    for i in range(1, rows):
        for j in range(i + 1):
            inner = sum(z**k / factorial(k) for k in range(j + 1))
            total += comb(i, j) * gain**j * exp(-(i - j) * n) * inner
    return (1.0 - (1.0 + total) * exp(-z) / rows) / ratio


@pytest.mark.parametrize("rows", [2, 3, 5, 8, 12])
def test_one_pass_agrees_with_the_closed_sum(rows: int) -> None:
    """Rows in parallel agree with the closed double sum."""
    for ntu, ratio in ((0.4, 0.9), (3.0, 1.5), (5.0, 0.3)):
        expected = _parallel_rows(ntu, ratio, rows)
        assert float(effectiveness(ntu, ratio, rows=rows)) == pytest.approx(expected, rel=1e-12)


@pytest.mark.parametrize(("ntu", "ratio"), [(0.5, 0.8), (3.0, 0.3), (2.0, 1.6)])
def test_row_a_pass_agrees_with_closed_forms(ntu: float, ratio: float) -> None:
    """Two, three and four rows of one row a pass agree with their closed forms (Nicole 1972)."""
    for rows in (2, 3, 4):
        gain = -expm1(-ntu / rows)
        half = 1.0 - 0.5 * gain
        if rows == 2:
            xi = 0.5 * gain + half * exp(2.0 * gain * ratio)
        elif rows == 3:
            xi = gain * (1.0 - 0.25 * gain - ratio * gain * half) * exp(gain * ratio)
            xi += half**2 * exp(3.0 * gain * ratio)
        else:
            xi = 0.5 * gain * (1.0 - 0.5 * gain + 0.25 * gain**2)
            xi += gain * half * (1.0 - 2.0 * ratio * gain * half) * exp(2.0 * gain * ratio)
            xi += half**3 * exp(4.0 * gain * ratio)
        p = float(effectiveness(ntu, ratio, rows=rows, passes=rows))
        assert p == pytest.approx((1.0 - 1.0 / xi) / ratio, rel=1e-12)


def test_bank_agrees_with_a_boundary_value_solver() -> None:
    """Three rows in three passes with unequal conductances, against collocation."""
    ntu, ratio, shares = 2.4, 0.7, np.array([0.5, 0.3, 0.2])
    gain = -np.expm1(-ntu * shares)
    direction = np.array([1.0, -1.0, 1.0])  # pass order is row 3, 2, 1

    def slopes(_: Floats, t: Floats) -> Floats:
        gas = np.zeros(t.shape[1])
        out = np.empty_like(t)
        for row in range(3):
            out[row] = direction[row] * ratio * gain[row] * (gas - t[row])
            gas = (1.0 - gain[row]) * gas + gain[row] * t[row]
        return out

    def ends(start: Floats, end: Floats) -> Floats:
        return np.array([start[2] - 1.0, end[1] - end[2], start[0] - start[1]])

    x = np.linspace(0.0, 1.0, 11)
    solved = solve_bvp(slopes, ends, x, np.full((3, x.size), 0.7), tol=1e-10)
    expected = (1.0 - solved.y[0, -1]) / ratio
    p = effectiveness(ntu, ratio, rows=3, passes=3, row_shares=tuple(shares.tolist()))
    assert float(p) == pytest.approx(expected, rel=1e-8)


def test_cells_converge_to_the_bank() -> None:
    """Cells in a sweep converge to 4 rows in 2 passes from 0.756651 (one segment) at second order."""

    def march(segments: int) -> float:
        # half the tube flow in each row of a pass, 1/segments of the gas through each cell
        fall = 0.5 / segments / 0.5
        gain, damping = cell(2.0 / 4, fall)
        inlet_of_second = 1.0
        gas = np.zeros((5, segments))
        for _ in range(60):
            outlets = {}
            for rows, inlet, order in (
                ((2, 3), 1.0, range(segments)),
                ((0, 1), inlet_of_second, range(segments - 1, -1, -1)),
            ):
                for row in rows:
                    t = inlet
                    for place in order:
                        q = float(gain * damping) * (t - gas[row, place])
                        gas[row + 1, place] = gas[row, place] + q
                        t -= fall * q
                    outlets[row] = t
            inlet_of_second = 0.5 * (outlets[2] + outlets[3])
        return float(gas[4].mean())

    assert march(1) == pytest.approx(0.756651, abs=1e-6)
    assert march(4) == pytest.approx(0.756268, abs=1e-6)
    errors = [march(segments) - float(effectiveness(2.0, 0.5, rows=4, passes=2)) for segments in (8, 16)]
    assert errors[0] / errors[1] == pytest.approx(4.0, rel=0.05)


def test_constant_tube_temperature_is_exact_at_zero_ratio() -> None:
    """At C = 0 every arrangement gives 1 - e^-NTU to rounding."""
    ntu = np.array([1e-9, 0.1, 1.0, 10.0, 1e3])
    expected = condensing(ntu)
    for p in (
        effectiveness(ntu, 0.0, rows=4, passes=2),
        effectiveness(ntu, 0.0, rows=5, passes=1),
        unmixed(ntu, 0.0),
        one_row(ntu, 0.0),
        gas_mixed(ntu, 0.0),
        counterflow(ntu, 0.0),
        cocurrent(ntu, 0.0),
        passes_over_face(ntu, 0.0, Circuit((2,)), 3),
    ):
        np.testing.assert_allclose(p, expected, rtol=5e-15)


def test_many_rows_in_one_pass_tend_to_unmixed() -> None:
    """Endless rows in one pass are crossflow with both fluids unmixed; the gap falls with rows squared."""
    gaps = [float(unmixed(3.0, 0.8) - effectiveness(3.0, 0.8, rows=rows)) for rows in (20, 40)]
    assert 0.0 < gaps[1] < gaps[0] < 1e-3
    assert gaps[0] / gaps[1] == pytest.approx(4.0, rel=0.02)


def test_many_passes_tend_to_counterflow() -> None:
    """One row a pass tends to counterflow as rows grow."""
    gap = float(counterflow(2.0, 0.9) - effectiveness(2.0, 0.9, rows=60, passes=60))
    assert 0.0 < gap < 2e-4


@pytest.mark.parametrize("ratio", [0.0, 1e-8, 0.5, 1.0, 1.0 + 1e-9, 1.8, 50.0, 1e8])
def test_huge_ntu_stays_finite_and_at_most_counterflow(ratio: float) -> None:
    """NTU up to 1e300 gives a finite P that does not pass counterflow."""
    ntu = np.array([1e3, 1e6, 1e300])
    for p in (
        effectiveness(ntu, ratio, rows=4, passes=4),
        effectiveness(ntu, ratio, rows=6, passes=2, counter=False),
        one_row(ntu, ratio),
        gas_mixed(ntu, ratio),
        cocurrent(ntu, ratio),
        unmixed(ntu, ratio),
        passes_over_face(ntu, ratio, Circuit((2, 2)), 2),
    ):
        assert np.isfinite(p).all()
        assert (p >= 0.0).all()
        assert (p <= counterflow(ntu, ratio) * (1.0 + 1e-12)).all()


_WIDE = st.floats(-6.0, 3.0).map(lambda power: 10.0**power)


@settings(max_examples=60, deadline=None)
@given(
    ntu=_WIDE,
    ratio=st.one_of(st.just(0.0), _WIDE),
    rows=st.integers(1, 8),
    data=st.data(),
)
def test_any_bank_lies_between_nothing_and_counterflow(
    ntu: float, ratio: float, rows: int, data: st.DataObject
) -> None:
    """Any bank at any NTU and C gives a P between 0 and counterflow."""
    passes = data.draw(st.integers(1, rows))
    counter = data.draw(st.booleans())
    p = float(effectiveness(ntu, ratio, rows=rows, passes=passes, counter=counter))
    best = float(counterflow(ntu, ratio))
    assert 0.0 < p <= best * (1.0 + 1e-12)
    if counter:
        assert p >= float(one_row(ntu, ratio)) * (1.0 - 1e-12)


def test_a_case_does_not_depend_on_its_neighbours() -> None:
    """A case alone gives the same bits as among others."""
    ntu, ratio = np.array([0.2, 3.0, 1e3, 1.1]), np.array([0.0, 0.7, 40.0, 1e-5])
    circuits = (Circuit((2, 2)), Circuit((1, 1, 1)), Circuit((4,)), Circuit((3, 2), counter=False))
    for circuit in circuits:
        together = circuit_effectiveness(ntu, ratio, circuit)
        alone = [float(circuit_effectiveness(ntu[i], ratio[i], circuit)) for i in range(4)]
        assert together.tolist() == alone
    together = unmixed(ntu, ratio)
    assert together.tolist() == [float(unmixed(ntu[i], ratio[i])) for i in range(4)]


def test_counterflow_ntu_inverts_counterflow() -> None:
    """NTU comes back from P, also beside C = 1."""
    ntu = np.array([0.01, 0.5, 2.0, 5.0])
    for ratio in (0.0, 0.4, 1.0 - 1e-9, 1.0, 1.0 + 1e-9, 2.5):
        np.testing.assert_allclose(counterflow_ntu(counterflow(ntu, ratio), ratio), ntu, rtol=2e-10)


def test_ntu_comes_back_and_the_impossible_is_said() -> None:
    """The NTU of a bank is found from its P; a P the bank never reaches is marked."""
    ntu, ratio = np.array([0.3, 1.0, 4.0, 0.0]), np.array([0.0, 0.5, 1.2, 0.5])

    def relation(n: Floats, c: Floats) -> Floats:
        return effectiveness(n, c, rows=4, passes=2)

    found, reached = ntu_for(relation(ntu, ratio), ratio, relation)
    assert reached.all()
    np.testing.assert_allclose(found, ntu, rtol=1e-10, atol=1e-14)
    _, reached = ntu_for(np.array([0.9, 0.6]), np.array([0.5, 0.5]), one_row)
    # one row ends at (1 - e^-C)/C = 0.787
    assert reached.tolist() == [False, True]


def test_passes_over_the_face_by_hand() -> None:
    """Two half faces of one row in series: 1 - (1 - q)^2 with q = C p/2."""
    ntu, ratio = 1.5, 0.8
    q = 0.5 * ratio * float(one_row(ntu, 0.5 * ratio))
    p = float(passes_over_face(ntu, ratio, Circuit((1,)), 2))
    assert p == pytest.approx((1.0 - (1.0 - q) ** 2) / ratio, rel=1e-14)


def test_joined_passes_by_pattern() -> None:
    """4 rows in 2 passes, NTU 2, C 0.5: how passes are joined moves P by a few thousandths."""
    p = {
        "matching": circuit_effectiveness(2.0, 0.5, Circuit((2, 2), connection="matching")),
        "nested": circuit_effectiveness(2.0, 0.5, Circuit((2, 2), connection="nested")),
        "same way": circuit_effectiveness(2.0, 0.5, Circuit((2, 2), connection="matching", alternate=False)),
        "unequal": circuit_effectiveness(2.0, 0.5, Circuit((2, 2), row_shares=(0.4, 0.3, 0.2, 0.1))),
    }
    expected = {"matching": 0.757719, "nested": 0.754740, "same way": 0.761132, "unequal": 0.748535}
    for name, value in expected.items():
        assert float(p[name]) == pytest.approx(value, abs=5.1e-7)


def test_rows_that_do_not_fit_are_refused_in_words() -> None:
    """Impossible circuits are refused with a sentence that names the quantity."""
    with pytest.raises(ValueError, match="rows_per_pass"):
        effectiveness(1.0, 0.5, rows=5, passes=(2, 2))
    with pytest.raises(ValueError, match="must be equal"):
        effectiveness(1.0, 0.5, rows=5, passes=2, connection="matching")
    with pytest.raises(ValueError, match="row_shares"):
        Circuit((2,), row_shares=(1.0,))
    with pytest.raises(ValueError, match="passes 3"):
        even_passes(2, 3)


def test_uneven_rows_go_to_the_first_passes() -> None:
    """Seven rows in three passes are 3, 2 and 2."""
    assert even_passes(7, 3) == (3, 2, 2)
