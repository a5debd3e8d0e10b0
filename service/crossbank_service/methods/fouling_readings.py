"""What plant readings say of fouling: mean readings, resistance and trend, each with its interval."""

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray
from scipy import special

from crossbank_service.methods.criterion import Values
from crossbank_service.methods.record import Array


def _along(values: Array) -> Array:
    # added in order along the last axis, so that a case's rounding does not depend on its neighbours
    return np.asarray(np.add.accumulate(values, axis=-1)[..., -1])


def student_factor(degrees_of_freedom: Values, probability: float = 0.95) -> Array:
    """Two-sided factor of Student's distribution.

    Parameters
    ----------
    degrees_of_freedom : array_like
        Degrees of freedom, at least 1; fractions allowed.
    probability : float
        Probability inside the interval.

    Returns
    -------
    Array
        Factor on the standard uncertainty.
    """
    dof = np.clip(np.asarray(degrees_of_freedom, dtype=np.float64), 1.0, 1e9)
    return np.asarray(special.stdtrit(dof, 0.5 * (1.0 + probability)))


@dataclass(frozen=True, kw_only=True)
class MeanReading:
    """Mean of repeated readings.

    Attributes
    ----------
    standard_uncertainty, degrees_of_freedom, expanded_uncertainty : Array
        Random and systematic part together; effective degrees of freedom; half width of the 95 % interval.
    """

    standard_uncertainty: Array
    degrees_of_freedom: Array
    expanded_uncertainty: Array


def mean_reading(systematic: Values, standard_deviation: Values, readings: Values) -> MeanReading:
    """Uncertainty of the mean of repeated readings.

    Parameters
    ----------
    systematic : array_like
        Systematic standard uncertainty, taken as certain; averaging does not reduce it.
    standard_deviation : array_like
        Standard deviation of single readings, same unit.
    readings : array_like
        Readings averaged, at least 2.

    Returns
    -------
    MeanReading
        Combined uncertainty.

    Notes
    -----
    u^2 = b^2 + s^2/n; degrees of freedom u^4/((s^2/n)^2/(n - 1)) (Welch and Satterthwaite); U95 = t u. ASME
    PTC 19.1 in general terms.
    """
    n = np.maximum(np.asarray(readings, dtype=np.float64), 2.0)
    random = np.asarray(standard_deviation, dtype=np.float64) ** 2 / n
    variance = np.asarray(systematic, dtype=np.float64) ** 2 + random
    scattered = random > 1e-9 * np.maximum(variance, 1e-300)
    dof = np.where(scattered, variance**2 * (n - 1.0) / np.where(scattered, random, 1.0) ** 2, 1e9)
    u = np.sqrt(variance)
    return MeanReading(
        standard_uncertainty=u,
        degrees_of_freedom=np.minimum(dof, 1e9),
        expanded_uncertainty=np.asarray(student_factor(dof) * u),
    )


def normalised_error(
    tested: Values, predicted: Values, tested_expanded: Values, predicted_expanded: Values
) -> Array:
    """Difference of test and prediction over their expanded uncertainties.

    Parameters
    ----------
    tested, predicted : array_like
        Both values, same unit.
    tested_expanded, predicted_expanded : array_like
        Half widths of their 95 % intervals, same unit.

    Returns
    -------
    Array
        E_n; at most 1 where they agree.

    Notes
    -----
    E_n = |Q_t - Q_p|/sqrt(U_t^2 + U_p^2).
    """
    width = np.hypot(np.asarray(tested_expanded, dtype=np.float64), predicted_expanded)
    return np.asarray(np.abs(np.asarray(tested) - predicted) / np.maximum(width, 1e-300))


def log_mean_difference(
    first_end_k: Values, second_end_k: Values, first_uncertainty_k: Values, second_uncertainty_k: Values
) -> tuple[Array, Array]:
    """Logarithmic mean temperature difference and its uncertainty.

    Parameters
    ----------
    first_end_k, second_end_k : array_like
        Terminal differences, above 0 [K].
    first_uncertainty_k, second_uncertainty_k : array_like
        Their standard uncertainties, independent [K].

    Returns
    -------
    tuple of Array
        Mean difference and its standard uncertainty [K].

    Notes
    -----
    dL/da = (1 - L/a)/ln(a/b), dL/db = (L/b - 1)/ln(a/b); 1/2 each where the ends are equal.
    """
    a = np.maximum(np.asarray(first_end_k, dtype=np.float64), 1e-9)
    b = np.maximum(np.asarray(second_end_k, dtype=np.float64), 1e-9)
    a, b = np.broadcast_arrays(a, b)
    log = np.log(a / b)
    # below this the closed forms lose more to cancellation than the series leaves out
    apart = np.abs(log) > 1e-3
    safe = np.where(apart, log, 1.0)
    mean = np.where(apart, (a - b) / safe, np.sqrt(a * b) * (1.0 + log**2 / 24.0))
    by_a = np.where(apart, (1.0 - mean / a) / safe, 0.5 - log / 6.0)
    by_b = np.where(apart, (mean / b - 1.0) / safe, 0.5 + log / 6.0)
    return mean, np.hypot(by_a * np.asarray(first_uncertainty_k), by_b * np.asarray(second_uncertainty_k))


@dataclass(frozen=True, kw_only=True)
class FoulingReading:
    """Fouling resistance from readings.

    Attributes
    ----------
    resistance_m2_k_w, standard_uncertainty_m2_k_w : Array
        Resistance, negative values kept, and its standard uncertainty [m2 K/W].
    low_m2_k_w, high_m2_k_w : Array
        Ends of the 95 % interval [m2 K/W].
    distinguishable : NDArray
        True where the resistance differs from zero by at least two standard uncertainties.
    """

    resistance_m2_k_w: Array
    standard_uncertainty_m2_k_w: Array
    low_m2_k_w: Array
    high_m2_k_w: Array
    distinguishable: NDArray[np.bool_]


def fouling_from_coefficients(
    dirty_w_m2_k: Values,
    clean_w_m2_k: Values,
    dirty_uncertainty: Values,
    clean_uncertainty: Values,
    correlation: Values = 0.0,
) -> FoulingReading:
    """Fouling resistance from the coefficient measured and the clean one of the same service.

    Parameters
    ----------
    dirty_w_m2_k, clean_w_m2_k : array_like
        Coefficient from the readings, and the clean one recalculated at their flows and temperatures [W/(m2
        K)].
    dirty_uncertainty, clean_uncertainty : array_like
        Relative standard uncertainties.
    correlation : array_like
        Correlation of the two, -1 to 1: 0 for an uncalibrated method, 0.7 to 0.9 after calibration by a
        commissioning test with the same instruments (a rule of this service).

    Returns
    -------
    FoulingReading
        Resistance with its interval.

    Notes
    -----
    R = 1/U_d - 1/U_c; u^2 = (u_d/U_d)^2 + (u_c/U_c)^2 - 2 r (u_d/U_d)(u_c/U_c). A negative resistance is a
    finding about readings or model, not zero.
    """
    dirty = 1.0 / np.maximum(np.asarray(dirty_w_m2_k, dtype=np.float64), 1e-9)
    clean = 1.0 / np.maximum(np.asarray(clean_w_m2_k, dtype=np.float64), 1e-9)
    a, b = dirty * np.asarray(dirty_uncertainty), clean * np.asarray(clean_uncertainty)
    r = np.clip(np.asarray(correlation, dtype=np.float64), -1.0, 1.0)
    u = np.sqrt(np.maximum(a**2 + b**2 - 2.0 * r * a * b, 0.0))
    resistance = np.asarray(dirty - clean)
    return FoulingReading(
        resistance_m2_k_w=resistance,
        standard_uncertainty_m2_k_w=u,
        low_m2_k_w=resistance - 1.96 * u,
        high_m2_k_w=resistance + 1.96 * u,
        distinguishable=np.abs(resistance) >= 2.0 * u,
    )


@dataclass(frozen=True, kw_only=True)
class Trend:
    """Straight line through a series, with what it is worth.

    Attributes
    ----------
    intercept, slope : Array
        Value at time 0 and rise per unit of time, (cases,).
    slope_standard_uncertainty, slope_low, slope_high : Array
        Standard uncertainty and 95 % interval of the slope, (cases,).
    distinguishable : NDArray
        True where the interval of the slope leaves out zero.
    scatter_ratio : Array
        Root of chi-squared over degrees of freedom: above 1 the series scatters more than its uncertainties
        say, and the intervals are widened by it.
    degrees_of_freedom : NDArray
        Readings less 2.
    mean_time, mean_variance, slope_variance : Array
        What `at` needs: weighted mean time, variances of the value there and of the slope.
    """

    intercept: Array
    slope: Array
    slope_standard_uncertainty: Array
    slope_low: Array
    slope_high: Array
    distinguishable: NDArray[np.bool_]
    scatter_ratio: Array
    degrees_of_freedom: NDArray[np.int64]
    mean_time: Array
    mean_variance: Array
    slope_variance: Array

    def at(self, time: Values) -> tuple[Array, Array, Array]:
        """Value of the line at a time, and the ends of its 95 % interval."""
        value = self.intercept + self.slope * np.asarray(time, dtype=np.float64)
        away = np.asarray(time) - self.mean_time
        half = _factor(self.degrees_of_freedom, self.scatter_ratio) * np.sqrt(
            self.mean_variance + self.slope_variance * away**2
        )
        return value, value - half, value + half

    def time_to(self, value: Values, never: float = 1e12) -> tuple[Array, Array, Array]:
        """Time at which the line reaches a value, by the slope and by the ends of its interval.

        Parameters
        ----------
        value : array_like
            Value to be reached.
        never : float
            Given where a slope does not lead there.

        Returns
        -------
        tuple of Array
            Time, earliest and latest, from the line's value at the mean time.
        """
        middle = self.intercept + self.slope * self.mean_time
        missing = np.asarray(value, dtype=np.float64) - middle

        def at_slope(slope: Array) -> Array:
            leads = slope * missing > 0.0
            time = self.mean_time + missing / np.where(leads, slope, 1.0)
            return np.where(missing == 0.0, self.mean_time, np.where(leads, np.minimum(time, never), never))

        one, other = at_slope(self.slope_low), at_slope(self.slope_high)
        return at_slope(self.slope), np.minimum(one, other), np.maximum(one, other)


def _factor(dof: NDArray[np.int64], scatter: Array) -> Array:
    # known uncertainties: normal; a scatter estimated from the series itself: Student
    return np.where(scatter > 1.0, student_factor(np.maximum(dof, 1).astype(np.float64)) * scatter, 1.96)


def trend(time: Array, values: Array, standard_uncertainty: Array) -> Trend:
    """Weighted straight line through a series of readings.

    Parameters
    ----------
    time, values, standard_uncertainty : Array
        Times in any unit, values and their independent standard uncertainties, (cases, readings) with at
        least two unlike times. An error common to the series (the clean coefficient, a calibration) belongs
        to the level and leaves the slope alone.

    Returns
    -------
    Trend
        Line with intervals.

    Notes
    -----
    Weighted least squares; where chi-squared over degrees of freedom exceeds 1 the uncertainties are scaled
    by its root (Birge ratio) and Student's factor replaces 1.96. With two readings there is no check of the
    scatter.
    """
    t = np.atleast_2d(np.asarray(time, dtype=np.float64))
    y = np.atleast_2d(np.asarray(values, dtype=np.float64))
    u = np.atleast_2d(np.asarray(standard_uncertainty, dtype=np.float64))
    t, y, u = np.broadcast_arrays(t, y, u)
    weight = 1.0 / np.maximum(u, 1e-150) ** 2
    whole = _along(weight)
    mean_time = _along(weight * t) / whole
    mean_value = _along(weight * y) / whole
    away = t - mean_time[:, np.newaxis]
    spread = _along(weight * away**2)
    sloped = spread > 0.0
    safe = np.where(sloped, spread, 1.0)
    slope = np.where(sloped, _along(weight * away * (y - mean_value[:, np.newaxis])) / safe, 0.0)
    # one time only: the slope is open, which a very large variance says without an infinity
    slope_variance = np.where(sloped, 1.0 / safe, 1e300)
    misfit = y - mean_value[:, np.newaxis] - slope[:, np.newaxis] * away
    dof = np.full(whole.shape, max(t.shape[-1] - 2, 0), dtype=np.int64)
    scatter = np.sqrt(_along(weight * misfit**2) / np.maximum(dof, 1)) * (dof > 0)
    half = _factor(dof, scatter) * np.sqrt(slope_variance)
    return Trend(
        intercept=mean_value - slope * mean_time,
        slope=slope,
        slope_standard_uncertainty=np.maximum(scatter, 1.0) * np.sqrt(slope_variance),
        slope_low=slope - half,
        slope_high=slope + half,
        distinguishable=np.abs(slope) > half,
        scatter_ratio=scatter,
        degrees_of_freedom=dof,
        mean_time=mean_time,
        mean_variance=1.0 / whole,
        slope_variance=slope_variance,
    )


def thermocouple_limit_k(temperature_k: Values, accuracy_class: int) -> Array:
    """Limit of error of a type K thermocouple.

    Parameters
    ----------
    temperature_k : array_like
        Temperature [K].
    accuracy_class : int
        1 or 2.

    Returns
    -------
    Array
        Limit of error, a temperature difference [K]; half of it serves as standard uncertainty.

    Notes
    -----
    IEC 60584, from memory: class 1 max(1.5, 0.004 |t|), class 2 max(2.5, 0.0075 |t|), t in C. A bare probe
    near hot or cold walls errs by 2 to 20 K more; a stratified duct needs a grid.
    """
    celsius = np.abs(np.asarray(temperature_k, dtype=np.float64) - 273.15)
    least, share = (1.5, 0.004) if accuracy_class == 1 else (2.5, 0.0075)
    return np.asarray(np.maximum(least, share * celsius))


def platinum_limit_k(temperature_k: Values, accuracy_class: str) -> Array:
    """Limit of error of a platinum resistance thermometer.

    Parameters
    ----------
    temperature_k : array_like
        Temperature [K].
    accuracy_class : str
        ``A`` or ``B``.

    Returns
    -------
    Array
        Limit of error, a temperature difference [K]; half of it serves as standard uncertainty.

    Notes
    -----
    IEC 60751, from memory: class A 0.15 + 0.002 |t|, class B 0.30 + 0.005 |t|, t in C.
    """
    celsius = np.abs(np.asarray(temperature_k, dtype=np.float64) - 273.15)
    base, share = (0.15, 0.002) if accuracy_class == "A" else (0.30, 0.005)
    return np.asarray(base + share * celsius)
