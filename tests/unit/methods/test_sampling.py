"""Sampling: lognormal factors, repeatable draws, percentiles against closed forms, failed samples."""

import numpy as np
import pytest
from scipy import special

from crossbank_service.methods import sampling


def test_lognormal_factors_have_mean_one_and_the_asked_spread() -> None:
    """Moments of the lognormal distribution: exp(mu + s^2/2) = 1 and exp(s^2) - 1 = u^2."""
    law = sampling.lognormal_of_mean_one(np.array([0.05, 0.15, 0.5]))
    np.testing.assert_allclose(np.exp(law.mu + 0.5 * law.sigma**2), 1.0, rtol=1e-14)
    np.testing.assert_allclose(np.sqrt(np.expm1(law.sigma**2)), [0.05, 0.15, 0.5], rtol=1e-13)
    assert sampling.lognormal_of_geometric_spread(1.5).factor(1.0) == pytest.approx(1.5)


def test_draws_repeat_and_longer_ones_begin_with_the_shorter() -> None:
    """One seed, one stream: doubling the samples keeps those already drawn."""
    few, many = sampling.standard_normal_draws(7, 100, 3), sampling.standard_normal_draws(7, 200, 3)
    assert np.array_equal(few, many[:100])
    assert not np.array_equal(few, sampling.standard_normal_draws(8, 100, 3))


def test_draws_follow_the_published_stream() -> None:
    """Seed 12345 of PCG64 begins with 0.22733602246716966 (numpy's own quick start)."""
    first = special.ndtr(sampling.standard_normal_draws(12345, 1, 1)[0, 0])
    assert first == pytest.approx(0.22733602246716966, rel=1e-13)


def test_draws_are_standard_normal() -> None:
    """Mean, variance and tail of 60 000 deviates within four standard errors."""
    z = sampling.standard_normal_draws(1, 20_000, 3).ravel()
    assert abs(z.mean()) < 4.0 / np.sqrt(z.size)
    assert abs(z.var() - 1.0) < 4.0 * np.sqrt(2.0 / z.size)
    assert abs((z > 1.959964).mean() - 0.025) < 4.0 * np.sqrt(0.025 * 0.975 / z.size)
    assert np.all(np.isfinite(z))


def test_antithetic_draws_come_in_opposite_pairs() -> None:
    """Pairs cancel; an odd count ends on half a pair."""
    z = sampling.standard_normal_draws(3, 7, 2, antithetic=True)
    assert z.shape == (7, 2)
    assert np.array_equal(z[0:6:2], -z[1:6:2])


@pytest.mark.parametrize(
    ("ntu", "u", "low", "high"),
    [(1.2, 0.08, 0.91646, 1.07774), (0.5, 0.15, 0.78445, 1.23105), (1.0, 0.10, 0.88406, 1.11019)],
)
def test_sampled_duty_has_the_percentiles_of_the_closed_form(
    ntu: float, u: float, low: float, high: float
) -> None:
    """Q/Q0 = (1 - exp(-NTU f))/(1 - exp(-NTU)) rises with f, so it carries the percentiles of f."""
    factor = sampling.lognormal_of_mean_one(u).factor(sampling.standard_normal_draws(2026, 40_000, 1)[:, 0])
    duty = np.expm1(-ntu * factor) / np.expm1(-ntu)
    found = sampling.summarise(duty)
    error = sampling.percentile_error(0.025, 40_000.0) * found.standard_deviation[0]
    np.testing.assert_allclose(found.percentiles[0, [0, 2]], [low, high], atol=4.0 * float(error))


def test_percentiles_are_numpys_and_failed_samples_are_counted() -> None:
    """Failed samples take no part; a case without answers is all zeros and says so."""
    values = np.random.default_rng(0).normal(size=(3, 501))
    answered = np.ones(values.shape, dtype=bool)
    answered[1, ::5] = False
    answered[2] = False
    values[0, 3] = np.nan
    found = sampling.summarise(values, answered)
    keep = np.isfinite(values[0])
    np.testing.assert_allclose(
        found.percentiles[0], np.quantile(values[0][keep], [0.025, 0.5, 0.975]), rtol=1e-12
    )
    np.testing.assert_allclose(
        found.percentiles[1], np.quantile(values[1][answered[1]], [0.025, 0.5, 0.975]), rtol=1e-12
    )
    assert found.standard_deviation[1] == pytest.approx(values[1][answered[1]].std(ddof=1))
    assert found.failed.tolist() == [1, 101, 501]
    assert found.percentiles[2].tolist() == [0.0, 0.0, 0.0]


def test_doubling_settles_when_the_percentiles_stand_still() -> None:
    """A shift of a tenth of the standard deviation is not settled, the same samples are."""
    z = sampling.standard_normal_draws(5, 2000, 1).T
    same, moved = sampling.summarise(z), sampling.summarise(z + 0.1)
    assert sampling.settled(same, same).tolist() == [True]
    assert sampling.settled(moved, same).tolist() == [False]


def test_probability_from_counts_is_honest_at_the_ends() -> None:
    """90 of 100: error 0.03, Wilson's interval 0.8256 to 0.9448; 100 of 100 still leaves 3.7 %."""
    p, error, low, high = sampling.sampled_probability(np.array([90.0, 100.0]), 100.0)
    assert p[0] == 0.9
    assert error[0] == pytest.approx(0.03)
    np.testing.assert_allclose([low[0], high[0]], [0.8256, 0.9448], atol=5e-5)
    assert low[1] == pytest.approx(0.9630, abs=5e-5)
    assert high[1] == pytest.approx(1.0)


def test_hard_bounds_from_the_same_deviates_stay_inside() -> None:
    """The rectangular deviate of a normal one lies between -1 and 1 with variance a third."""
    flat = sampling.rectangular_from_normal(sampling.standard_normal_draws(9, 20_000, 1))
    assert np.abs(flat).max() < 1.0
    assert flat.var() == pytest.approx(1.0 / 3.0, abs=0.01)
