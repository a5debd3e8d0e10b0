"""Reconciliation: against the matrix formulas, dependent balances, curved balances, suspects."""

import numpy as np
import pytest

from crossbank_service.methods import reconciliation
from crossbank_service.methods.record import Array


def _by_matrices(y: Array, u: Array, a: Array, b: Array) -> tuple[Array, Array, float]:
    v = np.diag(u**2)
    residual = a @ y - b
    inverse = np.linalg.inv(a @ v @ a.T)
    left = v - v @ a.T @ inverse @ a @ v
    return y - v @ a.T @ inverse @ residual, np.sqrt(np.diag(left)), float(residual @ inverse @ residual)


def test_balances_in_turn_give_the_matrix_solution() -> None:
    """Three balances on six readings, five cases, against inverse matrices."""
    rng = np.random.default_rng(11)
    y, u = rng.uniform(5.0, 20.0, (5, 6)), rng.uniform(0.1, 2.0, (5, 6))
    a, b = rng.integers(-2, 3, (5, 3, 6)).astype(np.float64), rng.uniform(-1.0, 1.0, (5, 3))
    found = reconciliation.reconcile_linear(y, u, a, b)
    for case in range(5):
        x, ux, chi = _by_matrices(y[case], u[case], a[case], b[case])
        np.testing.assert_allclose(found.values[case], x, rtol=1e-9)
        np.testing.assert_allclose(found.standard_uncertainty[case], ux, rtol=1e-7)
        assert found.chi_squared[case] == pytest.approx(chi, rel=1e-9)
    assert found.degrees_of_freedom.tolist() == [3] * 5


def test_a_balance_the_others_imply_counts_once() -> None:
    """Twice the first balance, and the sum of two, add neither freedom nor chi-squared."""
    y, u = np.array([[10.0, 6.2, 4.1, 3.9]]), np.array([0.3, 0.2, 0.2, 0.1])
    two = np.array([[1.0, -1.0, -1.0, 0.0], [0.0, 0.0, 1.0, -1.0]])
    four = np.vstack([two, 2.0 * two[0], two[0] + two[1]])
    once, again = (reconciliation.reconcile_linear(y, u, a) for a in (two, four))
    np.testing.assert_allclose(again.values, once.values, rtol=1e-12)
    assert again.degrees_of_freedom.tolist() == once.degrees_of_freedom.tolist() == [2]
    assert again.chi_squared[0] == pytest.approx(once.chi_squared[0], rel=1e-9)


def test_a_single_balance_cannot_name_the_culprit() -> None:
    """Both sides stand out alike, so no side is named though both are suspect and the balance is rejected."""
    found = reconciliation.reconcile_two_sides(350.0, 5.0, 400.0, 8.0)
    assert found.rejected.tolist() == [True]
    assert found.suspect.tolist() == [[True, True]]
    assert found.culprit.tolist() == [-1]
    assert np.abs(found.normalised_adjustment[0]) == pytest.approx(np.sqrt(found.chi_squared[0]), rel=1e-9)


def test_three_measures_of_one_flow_name_the_wrong_one() -> None:
    """Two balances on three meters of one pipe: the one that reads 12 among tens is the culprit."""
    chain = np.array([[1.0, -1.0, 0.0], [0.0, 1.0, -1.0]])
    found = reconciliation.reconcile_linear(np.array([[10.0, 12.0, 10.1]]), np.array([0.2, 0.2, 0.2]), chain)
    assert found.culprit.tolist() == [1]
    assert found.rejected.tolist() == [True]


def test_a_reading_no_balance_touches_stays_as_it_is() -> None:
    """Neither adjusted nor suspect."""
    found = reconciliation.reconcile_linear(
        np.array([[1.0, 2.0, 7.0]]), np.array([0.1, 0.1, 0.5]), np.array([[1.0, -1.0, 0.0]])
    )
    assert found.values[0, 2] == 7.0
    assert found.standard_uncertainty[0, 2] == 0.5
    assert found.normalised_adjustment[0, 2] == 0.0


def test_an_exact_reading_is_not_moved() -> None:
    """With uncertainty zero the other reading gives way entirely; two exact ones leave no test."""
    found = reconciliation.reconcile_two_sides(np.array([5.0, 5.0]), 0.0, 6.0, np.array([0.5, 0.0]))
    assert found.values[0].tolist() == [5.0, 5.0]
    assert found.degrees_of_freedom.tolist() == [1, 0]
    assert np.all(np.isfinite(found.normalised_adjustment))


def _heat_balance(x: Array) -> tuple[Array, Array]:
    # gas 1.05 kJ/(kg K) against water 4.19 kJ/(kg K) and a loss: m1 c1 (T1 - T2) - m2 c2 (T4 - T3) - loss
    m1, t1, t2, m2, t3, t4, loss = (x[:, i] for i in range(7))
    residual = m1 * 1.05 * (t1 - t2) - m2 * 4.19 * (t4 - t3) - loss
    slope = np.stack(
        [
            1.05 * (t1 - t2),
            1.05 * m1,
            -1.05 * m1,
            -4.19 * (t4 - t3),
            4.19 * m2,
            -4.19 * m2,
            -np.ones_like(m1),
        ],
        axis=-1,
    )
    return residual[:, np.newaxis], slope[:, np.newaxis, :]


def test_a_heat_balance_closes_at_the_reconciled_readings() -> None:
    """Flow times heat capacity times difference, with a casing loss: closed, settled, least adjusted."""
    y = np.array([[9.0, 320.0, 190.0, 7.6, 105.0, 142.0, 20.0]])
    u = np.array([0.30, 1.5, 1.5, 0.10, 0.4, 0.4, 10.0])
    found = reconciliation.reconcile(y, u, _heat_balance)
    assert abs(_heat_balance(found.values)[0][0, 0]) < 1e-9
    assert found.last_step[0] < 1e-9
    assert found.chi_squared[0] == pytest.approx(float((((y - found.values) / u) ** 2).sum()), rel=1e-8)
    # stationary: the adjustment over u^2 is parallel to the balance's slope (Lagrange)
    slope = _heat_balance(found.values)[1][0, 0]
    multipliers = (y - found.values)[0] / u**2 / slope
    np.testing.assert_allclose(multipliers, multipliers[0], rtol=1e-7)


def test_a_case_alone_equals_the_case_beside_others() -> None:
    """Bit for bit."""
    y = np.random.default_rng(3).normal(1.0, 0.05, (6, 7)) * np.array(
        [9.0, 320.0, 190.0, 7.6, 105.0, 142.0, 20.0]
    )
    u = np.array([0.30, 1.5, 1.5, 0.10, 0.4, 0.4, 10.0])
    together, alone = (
        reconciliation.reconcile(y, u, _heat_balance),
        reconciliation.reconcile(y[2:3], u, _heat_balance),
    )
    assert np.array_equal(together.values[2:3], alone.values)
    assert together.chi_squared[2] == alone.chi_squared[0]
