"""Fouling from readings: intervals, negative values, trends against other fits, instruments."""

import numpy as np
import pytest
from scipy import stats

from crossbank_service.methods import fouling_readings
from crossbank_service.methods.record import Array


def test_a_negative_resistance_is_kept() -> None:
    """A coefficient above the clean one is a finding about readings or model."""
    found = fouling_readings.fouling_from_coefficients(np.array([42.0]), 40.0, 0.01, 0.01)
    assert found.resistance_m2_k_w[0] == pytest.approx(1 / 42 - 1 / 40)


def test_a_small_resistance_is_not_distinguishable_from_none() -> None:
    """From an uncalibrated method at 6 % a loss of 5 % says nothing; calibrated it does."""
    found = fouling_readings.fouling_from_coefficients(
        38.0, 40.0, np.array([0.03, 0.01]), np.array([0.06, 0.01]), np.array([0.0, 0.9])
    )
    assert found.distinguishable.tolist() == [False, True]
    assert found.low_m2_k_w[0] < 0.0 < found.high_m2_k_w[0]


def test_equal_ends_have_the_mean_difference_of_either() -> None:
    """The closed form is 0/0 there; the series joins it without a step."""
    ends = 20.0 * (1.0 + np.array([0.0, 0.9e-3, 1.1e-3]))
    mean, u = fouling_readings.log_mean_difference(ends, 20.0, 1.0, 1.0)
    np.testing.assert_allclose(mean, 20.0 * (1.0 + np.array([0.0, 0.45e-3, 0.55e-3])), rtol=1e-6)
    np.testing.assert_allclose(u, np.sqrt(0.5), rtol=1e-3)
    assert u[1] == pytest.approx(u[2], rel=1e-5)


def test_mean_difference_sensitivities_are_those_of_small_steps() -> None:
    """Each end alone, by central differences of the mean."""
    for a, b in ((60.0, 20.0), (5.0, 25.0)):
        step = 1e-4
        for da, db in ((step, 0.0), (0.0, step)):
            up = fouling_readings.log_mean_difference(a + da, b + db, 0.0, 0.0)[0]
            down = fouling_readings.log_mean_difference(a - da, b - db, 0.0, 0.0)[0]
            u = fouling_readings.log_mean_difference(a, b, da / step, db / step)[1]
            assert u == pytest.approx(float(up - down) / (2 * step), rel=1e-6)


def _series() -> tuple[Array, Array]:
    t = np.array([0.0, 10.0, 25.0, 40.0, 55.0, 80.0])
    return t, np.array([1.0, 1.4, 1.5, 2.4, 2.5, 3.6]) * 1e-4


def test_a_scattered_trend_has_the_interval_of_ordinary_regression() -> None:
    """Where the scatter exceeds what was claimed, slope, error and interval are those of scipy's line."""
    t, r = _series()
    line = stats.linregress(t, r)
    found = fouling_readings.trend(t, r, np.full(6, 1e-7))
    assert found.scatter_ratio[0] > 1.0
    assert found.slope[0] == pytest.approx(line.slope, rel=1e-10)
    assert found.intercept[0] == pytest.approx(line.intercept, rel=1e-10)
    assert found.slope_standard_uncertainty[0] == pytest.approx(line.stderr, rel=1e-9)
    assert found.slope_high[0] - found.slope[0] == pytest.approx(
        float(stats.t.ppf(0.975, 4)) * line.stderr, rel=1e-9
    )
    assert found.distinguishable.tolist() == [True]
    value, low, high = found.at(0.0)
    assert value[0] == pytest.approx(line.intercept, rel=1e-10)
    assert high[0] - low[0] == pytest.approx(
        2 * float(stats.t.ppf(0.975, 4)) * line.intercept_stderr, rel=1e-9
    )


def test_a_quiet_trend_keeps_the_uncertainties_it_was_given() -> None:
    """Where the readings scatter less than claimed the claim stands, as in numpy's unscaled weighted fit."""
    t, r = _series()
    u = np.array([1.0, 2.0, 1.0, 2.0, 1.0, 1.5]) * 5e-5
    coefficients, covariance = np.polyfit(t, r, 1, w=1.0 / u, cov="unscaled")
    found = fouling_readings.trend(t, r, u)
    assert found.scatter_ratio[0] < 1.0
    assert found.slope[0] == pytest.approx(coefficients[0], rel=1e-9)
    assert found.slope_standard_uncertainty[0] == pytest.approx(np.sqrt(covariance[0, 0]), rel=1e-9)


def test_time_to_a_limit_lies_between_its_ends() -> None:
    """A clear trend reaches the limit; one that falls, or may be flat, never does at one end."""
    t, r = _series()
    found = fouling_readings.trend(t, np.stack([r, -r]), np.full(6, 1e-5))
    time, early, late = found.time_to(5e-4)
    assert early[0] < time[0] < late[0] < 1e4
    assert found.intercept[0] + found.slope[0] * time[0] == pytest.approx(5e-4, rel=1e-12)
    assert time[1] == 1e12


def test_readings_at_one_time_leave_the_slope_open() -> None:
    """Finite, flat and not distinguishable."""
    found = fouling_readings.trend(np.full(3, 5.0), np.array([1.0, 1.1, 0.9]), np.full(3, 0.2))
    assert found.slope[0] == 0.0
    assert found.distinguishable.tolist() == [False]
    assert np.isfinite(found.slope_high[0])


def test_a_trend_alone_equals_the_trend_beside_others() -> None:
    """Bit for bit, whatever the layout in memory."""
    t, r = _series()
    many = np.asfortranarray(np.stack([r, 2 * r, r + 1e-5]))
    together, alone = (
        fouling_readings.trend(t, many, np.full(6, 1e-5)),
        fouling_readings.trend(t, 2 * r, np.full(6, 1e-5)),
    )
    assert together.slope[1] == alone.slope[0]
    assert together.slope_high[1] == alone.slope_high[0]


def test_test_and_prediction_agree_within_their_intervals() -> None:
    """|104 - 100|/hypot(3, 4) = 0.8."""
    assert fouling_readings.normalised_error(104.0, 100.0, 3.0, 4.0) == pytest.approx(0.8)


def test_instrument_limits_grow_with_temperature() -> None:
    """IEC 60584 and 60751, from memory: 1.5 K to 375 C and 2 K at 500 C; class A 0.35 K at 100 C, B 0.8 K."""
    couple = fouling_readings.thermocouple_limit_k(np.array([293.15, 773.15]), 1)
    np.testing.assert_allclose(couple, [1.5, 2.0])
    assert fouling_readings.thermocouple_limit_k(773.15, 2) == pytest.approx(3.75)
    assert fouling_readings.platinum_limit_k(373.15, "A") == pytest.approx(0.35)
    assert fouling_readings.platinum_limit_k(373.15, "B") == pytest.approx(0.80)
