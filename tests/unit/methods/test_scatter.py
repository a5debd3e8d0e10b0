"""Scatter: conversions, propagation against published examples, sensitivities, probability of duty."""

from typing import Any

import ht
import numpy as np
import pytest

from crossbank_service.methods import scatter


def test_hard_bounds_and_bands_by_hand() -> None:
    """15 % at 95 % is 0.0765; bounds of 3 % are 0.01732."""
    assert scatter.from_coverage(0.15) == pytest.approx(0.07653, abs=5e-6)
    assert scatter.from_hard_bounds(0.03) == pytest.approx(0.017321, abs=5e-7)


def test_the_electrical_example_of_the_guide_is_repeated() -> None:
    """JCGM 100 (2008), H.2, from memory: R, X, Z of five readings of voltage, current and phase."""
    readings = np.array(
        [
            [5.007, 4.994, 5.005, 4.990, 4.999],
            [19.663e-3, 19.639e-3, 19.640e-3, 19.685e-3, 19.678e-3],
            [1.0456, 1.0438, 1.0468, 1.0428, 1.0433],
        ]
    )
    v, i, phase = readings.mean(axis=1)
    covariance = np.cov(readings) / 5.0
    absolute = np.sqrt(np.diag(covariance))
    correlation = covariance / np.outer(absolute, absolute)
    relative = absolute / readings.mean(axis=1)
    sensitivities = np.array(
        [[1.0, -1.0, -phase * np.tan(phase)], [1.0, -1.0, phase / np.tan(phase)], [1.0, -1.0, 0.0]]
    )
    u, shares = scatter.combined(sensitivities, relative, correlation)
    values = v / i * np.array([np.cos(phase), np.sin(phase), 1.0])
    np.testing.assert_allclose(values, [127.732, 219.847, 254.260], atol=5.1e-4)
    np.testing.assert_allclose(u * values, [0.071, 0.295, 0.236], atol=6e-4)
    np.testing.assert_allclose(shares.sum(axis=-1), 1.0, rtol=1e-12)


def test_full_correlation_adds_or_cancels() -> None:
    """Two equal parts, fully correlated, double or vanish; uncorrelated they add in squares."""
    s = np.array([[1.0, 1.0], [1.0, -1.0]])
    u, _ = scatter.combined(s, np.array([0.1, 0.1]), np.ones((2, 2)))
    np.testing.assert_allclose(u, [0.2, 0.0], atol=1e-12)
    assert scatter.combined(s, np.array([0.1, 0.1]))[0][0] == pytest.approx(np.sqrt(0.02))


def test_the_outside_film_of_an_air_heater_dominates() -> None:
    """The shares tell what to measure: 0.93677 of the resistance makes 97 % of the variance."""
    u, shares = scatter.overall_coefficient_uncertainty(
        np.array([[0.020, 0.0005, 0.00005, 0.0008]]), np.array([0.075, 0.5, 0.02, 0.11])
    )
    assert shares[0, 0] == pytest.approx((0.9367681 * 0.075 / u[0]) ** 2, rel=1e-6)
    assert shares[0, 0] > 0.96


def _effectiveness(ntu: float, capacity_ratio: float) -> float:
    return float(ht.effectiveness_from_NTU(ntu, capacity_ratio, subtype="counterflow"))  # type: ignore[no-untyped-call]


@pytest.mark.parametrize("capacity_ratio", [0.0, 0.3, 0.8, 0.999, 1.0])
def test_counterflow_sensitivity_is_the_slope_of_the_effectiveness(capacity_ratio: float) -> None:
    """Central differences of the effectiveness of an independent library."""
    effectiveness: Any = ht.effectiveness_from_NTU
    for ntu in (0.1, 1.0, 3.0, 6.0):
        up, middle, down = (
            float(effectiveness(ntu * f, capacity_ratio, subtype="counterflow"))
            for f in (1.0001, 1.0, 0.9999)
        )
        slope = scatter.sensitivity(up, down, middle, 1e-4)
        assert scatter.duty_sensitivity_counterflow(ntu, capacity_ratio) == pytest.approx(
            float(slope), rel=2e-6
        )


def test_condensing_is_counterflow_against_an_endless_stream() -> None:
    """Capacity ratio 0, from no transfer units to very many."""
    ntu = np.array([0.0, 1e-6, 0.5, 5.0, 1e4])
    np.testing.assert_allclose(
        scatter.duty_sensitivity_condensing(ntu), scatter.duty_sensitivity_counterflow(ntu, 0.0), rtol=1e-9
    )


def test_pressure_drop_counts_the_free_area_twice() -> None:
    """hypot(0.12, 2 x 0.02, 0.003) = 0.12653."""
    assert scatter.pressure_drop_uncertainty(0.12) == pytest.approx(0.126527, abs=5e-7)
    assert scatter.outlet_temperature_uncertainty_k(0.04, 330.0, 280.0) == pytest.approx(2.0)


def test_probability_and_margin_are_inverse() -> None:
    """The margin for a probability makes it; without spread the sign of the margin decides."""
    p = np.array([0.5, 0.9, 0.99])
    margin = scatter.margin_for_probability(p, 0.07)
    np.testing.assert_allclose(scatter.probability_of_duty(margin, 0.07), p, rtol=1e-12)
    assert scatter.probability_of_duty(np.array([0.01, -0.01]), 0.0).tolist() == [1.0, 0.0]


def test_a_method_outside_its_range_is_doubted_twice_as_much() -> None:
    """Distance counts from the end passed; inside it is none."""
    distance = scatter.outside_range(np.array([800.0, 1e3, 5e4, 1.2e5]), 1e3, 1e5)
    np.testing.assert_allclose(distance, [0.2, 0.0, 0.0, 0.2])
    np.testing.assert_allclose(scatter.widened(0.08, distance), [0.16, 0.08, 0.08, 0.16])
