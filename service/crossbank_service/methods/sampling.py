"""Seeded sampling: lognormal factors, draws that any platform repeats, percentiles and their errors."""

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray
from scipy import special

from crossbank_service.methods.criterion import Values
from crossbank_service.methods.record import Array


def _along(values: Array) -> Array:
    # added in order along the last axis, so that a case's rounding does not depend on its neighbours
    return np.asarray(np.add.accumulate(values, axis=-1)[..., -1])


@dataclass(frozen=True, kw_only=True)
class LogNormal:
    """Parameters of a lognormal factor: mean and standard deviation of its logarithm."""

    mu: Array
    sigma: Array

    def factor(self, deviate: Values) -> Array:
        """Factor of a standard normal deviate: exp(mu + sigma z)."""
        return np.asarray(np.exp(self.mu + self.sigma * np.asarray(deviate)))


def lognormal_of_mean_one(standard_uncertainty: Values) -> LogNormal:
    """Lognormal factor with mean 1: sigma^2 = ln(1 + u^2), mu = -sigma^2/2."""
    square = np.log1p(np.asarray(standard_uncertainty, dtype=np.float64) ** 2)
    return LogNormal(mu=np.asarray(-0.5 * square), sigma=np.sqrt(square))


def lognormal_of_geometric_spread(spread: Values) -> LogNormal:
    """Lognormal factor with median 1 and a geometric standard deviation, such as 1.5 for fouling and bond."""
    sigma = np.log(np.maximum(np.asarray(spread, dtype=np.float64), 1.0))
    return LogNormal(mu=np.zeros(sigma.shape), sigma=sigma)


def standard_normal_draws(seed: int, samples: int, inputs: int, *, antithetic: bool = False) -> Array:
    """Draw seeded standard normal deviates that any platform and release repeats.

    Parameters
    ----------
    seed : int
        Seed, at least 0.
    samples, inputs : int
        Samples and deviates per sample. More samples of one seed begin with the fewer.
    antithetic : bool
        True for pairs of opposite deviates, one after the other.

    Returns
    -------
    Array
        Deviates, (samples, inputs).

    Notes
    -----
    Raw words of PCG64, whose stream numpy keeps for good (its distributions may change between releases);
    the upper 53 bits, centred, through the inverse normal distribution. A factor of a method is drawn once
    a sample for the whole bank: drawn per row it would average away.
    """
    drawn = (samples + 1) // 2 if antithetic else samples
    words = np.asarray(np.random.PCG64(seed).random_raw(drawn * inputs), dtype=np.uint64)
    uniform = ((words >> np.uint64(11)).astype(np.float64) + 0.5) * 2.0**-53
    deviates = np.asarray(special.ndtri(uniform), dtype=np.float64).reshape(drawn, inputs)
    if not antithetic:
        return deviates
    return np.stack([deviates, -deviates], axis=1).reshape(2 * drawn, inputs)[:samples]


def rectangular_from_normal(deviate: Values) -> Array:
    """Uniform deviate from -1 to 1 of a standard normal one, for inputs known by hard bounds."""
    return np.asarray(2.0 * special.ndtr(np.asarray(deviate, dtype=np.float64)) - 1.0)


@dataclass(frozen=True, kw_only=True)
class Sampled:
    """What samples of a result say, case axis first.

    Attributes
    ----------
    mean, standard_deviation : Array
        Of the samples that were answered, (cases,).
    percentiles : Array
        Asked for, (cases, percentiles).
    answered, failed : NDArray
        Samples that gave a number and that did not; never dropped in silence.
    """

    mean: Array
    standard_deviation: Array
    percentiles: Array
    answered: NDArray[np.int64]
    failed: NDArray[np.int64]


def summarise(
    samples: Array, answered: NDArray[np.bool_] | None = None, shares: tuple[float, ...] = (0.025, 0.5, 0.975)
) -> Sampled:
    """Summarise samples of a result.

    Parameters
    ----------
    samples : Array
        Results, (cases, samples).
    answered : NDArray or None
        True where the sample gave a result; None where all did. A result that is not finite counts as failed.
    shares : tuple of float
        Percentiles wanted, as fractions.

    Returns
    -------
    Sampled
        Mean, standard deviation, percentiles. All 0 in a case where no sample was answered: look at
        ``answered``.

    Notes
    -----
    JCGM 101, 7.5 to 7.7; percentiles by straight interpolation between order statistics at (n - 1) p.
    """
    values = np.atleast_2d(np.asarray(samples, dtype=np.float64))
    good = np.isfinite(values)
    if answered is not None:
        good = good & answered
    count = np.count_nonzero(good, axis=-1)
    kept = np.where(good, values, 0.0)
    mean = _along(kept) / np.maximum(count, 1)
    away = np.where(good, values - mean[:, np.newaxis], 0.0)
    deviation = np.sqrt(_along(away**2) / np.maximum(count - 1, 1))
    ordered = np.sort(np.where(good, values, np.inf), axis=-1)
    place = np.maximum(count - 1, 0)[:, np.newaxis] * np.asarray(shares, dtype=np.float64)
    low = np.floor(place).astype(np.int64)
    high = np.minimum(low + 1, np.maximum(count - 1, 0)[:, np.newaxis])
    under, over = np.take_along_axis(ordered, low, -1), np.take_along_axis(ordered, high, -1)
    some = (count > 0)[:, np.newaxis]
    under, over = np.where(some, under, 0.0), np.where(some, over, 0.0)
    return Sampled(
        mean=mean,
        standard_deviation=deviation,
        percentiles=under + (place - low) * (over - under),
        answered=count,
        failed=values.shape[-1] - count,
    )


def percentile_error(share: Values, samples: Values) -> Array:
    """Estimate the standard error of a sampled percentile of a normal result, over its standard deviation.

    Notes
    -----
    sqrt(p (1 - p)/M)/density: 0.027 at 2.5 % and 10 000 samples.
    """
    p = np.clip(np.asarray(share, dtype=np.float64), 1e-9, 1.0 - 1e-9)
    density = np.exp(-0.5 * special.ndtri(p) ** 2) / np.sqrt(2.0 * np.pi)
    return np.asarray(np.sqrt(p * (1.0 - p) / np.maximum(samples, 1.0)) / density)


def settled(before: Sampled, after: Sampled, share: float = 0.02) -> NDArray[np.bool_]:
    """Whether doubling the samples moved every percentile by less than a share of the standard deviation."""
    moved = np.abs(after.percentiles - before.percentiles)
    return np.asarray((moved <= share * after.standard_deviation[:, np.newaxis]).all(axis=-1))


def sampled_probability(met: Values, samples: Values) -> tuple[Array, Array, Array, Array]:
    """Probability from counts, with its binomial error.

    Parameters
    ----------
    met, samples : array_like
        Samples that meet the duty, and all that were answered.

    Returns
    -------
    tuple of Array
        Share, its standard error, and the ends of Wilson's 95 % interval, which stays honest at 0 and 1.
    """
    n = np.maximum(np.asarray(samples, dtype=np.float64), 1.0)
    p = np.asarray(met, dtype=np.float64) / n
    z2 = 1.959963984540054**2
    centre = (p + z2 / (2.0 * n)) / (1.0 + z2 / n)
    half = np.sqrt(z2) / (1.0 + z2 / n) * np.sqrt(p * (1.0 - p) / n + z2 / (4.0 * n**2))
    return p, np.sqrt(p * (1.0 - p) / n), np.maximum(centre - half, 0.0), np.minimum(centre + half, 1.0)
