"""Scatter and its consequences: standard uncertainty, propagation, probability of duty."""

import numpy as np
from scipy import special

from crossbank_service.methods.criterion import Criterion, Values
from crossbank_service.methods.record import Array


def _along(values: Array) -> Array:
    # added in order along the last axis, so that a case's rounding does not depend on its neighbours
    return np.asarray(np.add.accumulate(values, axis=-1)[..., -1])


# --- published scatter to standard uncertainty


def from_mean_absolute_deviation(deviation: Values) -> Array:
    """Convert to standard uncertainty from a mean absolute deviation: sqrt(pi/2) times, normal errors."""
    return np.asarray(np.sqrt(0.5 * np.pi) * np.asarray(deviation, dtype=np.float64))


def from_coverage(half_width: Values, share: Values = 0.95) -> Array:
    """Convert to standard uncertainty from a band that holds a share of the points.

    Parameters
    ----------
    half_width : array_like
        Half width of the band, as a fraction.
    share : array_like
        Share of points inside; 0.95 where a bare plus-or-minus is all that is printed.

    Returns
    -------
    Array
        Standard uncertainty.

    Notes
    -----
    a/z with z = 1.960 (95 %), 1.645 (90 %), 1.150 (75 %), 1.080 (72 %) of the normal distribution. JCGM
    100, 4.3.
    """
    inside = np.clip(np.asarray(share, dtype=np.float64), 1e-6, 1.0 - 1e-12)
    return np.asarray(np.asarray(half_width, dtype=np.float64) / special.ndtri(0.5 * (1.0 + inside)))


def from_hard_bounds(half_width: Values) -> Array:
    """Convert hard bounds to standard uncertainty: half width over sqrt(3) (JCGM 100, 4.3.7)."""
    return np.asarray(np.asarray(half_width, dtype=np.float64) / np.sqrt(3.0))


def outside_range(value: Values, at_least: float | None = None, at_most: float | None = None) -> Array:
    """How far a value lies outside a method's range.

    Parameters
    ----------
    value : array_like
        Value in the quantity of the range.
    at_least, at_most : float or None
        Ends of the range.

    Returns
    -------
    Array
        Distance over the range's end it passed; 0 inside.
    """
    given = np.asarray(value, dtype=np.float64)
    below = np.zeros(given.shape) if at_least is None else (at_least - given) / max(abs(at_least), 1e-300)
    above = np.zeros(given.shape) if at_most is None else (given - at_most) / max(abs(at_most), 1e-300)
    return np.asarray(np.clip(np.maximum(below, above), 0.0, 1e300))


def widened(standard_uncertainty: Values, distance_outside: Values) -> Array:
    """Double the uncertainty of a method used outside its range (a rule of this service)."""
    return np.asarray(
        np.asarray(standard_uncertainty, dtype=np.float64)
        * np.where(np.asarray(distance_outside) > 0.0, 2.0, 1.0)
    )


# --- propagation


def sensitivity(higher: Values, lower: Values, middle: Values, relative_step: Values) -> Array:
    """Relative sensitivity (x/y) dy/dx by central differences.

    Parameters
    ----------
    higher, lower, middle : array_like
        Result with the input raised and lowered by the step, and as it is.
    relative_step : array_like
        Step over the input, 1e-4 to 1e-3 on results converged to 1e-8.

    Returns
    -------
    Array
        Sensitivity; 0 where the result is 0.
    """
    y = np.asarray(middle, dtype=np.float64)
    safe = np.where(y == 0.0, 1.0, y)
    return np.where(y == 0.0, 0.0, (np.asarray(higher) - lower) / (2.0 * np.asarray(relative_step) * safe))


def combined(
    sensitivities: Array, standard_uncertainty: Array, correlation: Array | None = None
) -> tuple[Array, Array]:
    """Combine uncertainties by sensitivities.

    Parameters
    ----------
    sensitivities, standard_uncertainty : Array
        Sensitivity to each input and its standard uncertainty, (cases, inputs).
    correlation : Array or None
        Correlation matrix of the inputs, (inputs, inputs) or (cases, inputs, inputs).

    Returns
    -------
    tuple of Array
        Combined standard uncertainty (cases,), and each input's share of its square (cases, inputs), which
        sum to 1; a share is negative where a correlation takes away more than the input brings.

    Notes
    -----
    u^2 = sum (S_i u_i)^2 + 2 sum r_ij S_i S_j u_i u_j. JCGM 100, equations 10 and 13. A correlated pair's
    term is halved between the two.
    """
    part = np.asarray(sensitivities, dtype=np.float64) * standard_uncertainty
    if correlation is None:
        pieces = part**2
    else:
        matrix = np.asarray(correlation, dtype=np.float64)
        pieces = part * _along(matrix * part[..., np.newaxis, :])
    square = np.maximum(_along(pieces), 0.0)
    some = square > 0.0
    shares = np.where(some[..., np.newaxis], pieces / np.where(some, square, 1.0)[..., np.newaxis], 0.0)
    return np.sqrt(square), shares


def overall_coefficient_uncertainty(resistances: Array, standard_uncertainty: Array) -> tuple[Array, Array]:
    """Relative uncertainty of an overall coefficient from its resistances.

    Parameters
    ----------
    resistances, standard_uncertainty : Array
        Resistances on one area and their relative standard uncertainties (that of a film equals that of its
        coefficient), (cases, resistances).

    Returns
    -------
    tuple of Array
        Relative standard uncertainty (cases,) and shares of its square (cases, resistances).

    Notes
    -----
    The sensitivity to a resistance is its share of the total.
    """
    r = np.asarray(resistances, dtype=np.float64)
    whole = np.maximum(_along(r), 1e-300)
    return combined(r / whole[..., np.newaxis], standard_uncertainty)


def duty_sensitivity_condensing(ntu: Values) -> Array:
    """Sensitivity of the duty to UA where one side keeps its temperature.

    Parameters
    ----------
    ntu : array_like
        Number of transfer units.

    Returns
    -------
    Array
        NTU exp(-NTU)/(1 - exp(-NTU)): 1 at 0.
    """
    n = np.clip(np.asarray(ntu, dtype=np.float64), 1e-12, 700.0)
    return np.asarray(n / np.expm1(n))


def duty_sensitivity_counterflow(ntu: Values, capacity_ratio: Values) -> Array:
    """Sensitivity of the duty to UA in counterflow.

    Parameters
    ----------
    ntu : array_like
        Number of transfer units.
    capacity_ratio : array_like
        Smaller over larger capacity rate, 0 to 1.

    Returns
    -------
    Array
        (NTU/e) de/dNTU: 1/(1 + NTU) at equal capacities.

    Notes
    -----
    With d = 1 - C and x = exp(-NTU d): e = (1 - x)/(1 - C x), so S = NTU d^2 x/((1 - C x)(1 - x)).
    """
    n, c = np.broadcast_arrays(
        np.clip(np.asarray(ntu, dtype=np.float64), 1e-12, 700.0),
        np.clip(np.asarray(capacity_ratio, dtype=np.float64), 0.0, 1.0),
    )
    d = 1.0 - c
    level = n * d < 1e-7
    safe = np.where(level, 1.0, d)
    lost = -np.expm1(-n * safe)
    apart = n * safe**2 * np.exp(-n * safe) / ((safe + (1.0 - safe) * lost) * lost)
    return np.where(level, 1.0 / (1.0 + n), apart)


def outlet_temperature_uncertainty_k(duty_uncertainty: Values, outlet_k: Values, inlet_k: Values) -> Array:
    """Absolute standard uncertainty of an outlet temperature [K]: the duty's times the temperature change."""
    return np.asarray(np.asarray(duty_uncertainty, dtype=np.float64) * np.abs(np.asarray(outlet_k) - inlet_k))


def pressure_drop_uncertainty(method: Values, free_area: Values = 0.02, density: Values = 0.003) -> Array:
    """Relative standard uncertainty of a pressure drop from those of method, free area and density.

    Notes
    -----
    The drop goes as the inverse square of the free area at a given flow, so that counts twice.
    """
    return np.asarray(
        np.sqrt(
            np.asarray(method, dtype=np.float64) ** 2
            + (2.0 * np.asarray(free_area)) ** 2
            + np.asarray(density) ** 2
        )
    )


# --- margin and probability


def probability_of_duty(margin: Values, standard_uncertainty: Values) -> Array:
    """Probability of making the duty from its relative margin and relative standard uncertainty (normal)."""
    wide = np.asarray(margin, dtype=np.float64)
    u = np.asarray(standard_uncertainty, dtype=np.float64)
    sure = np.where(wide >= 0.0, 1.0, 0.0)
    return np.where(u > 0.0, special.ndtr(wide / np.where(u > 0.0, u, 1.0)), sure)


def margin_for_probability(probability: Values, standard_uncertainty: Values) -> Array:
    """Relative margin of duty that makes it with a probability; over the sensitivity it is one of UA."""
    p = np.clip(np.asarray(probability, dtype=np.float64), 1e-12, 1.0 - 1e-12)
    return np.asarray(special.ndtri(p) * np.asarray(standard_uncertainty))


DUTY = Criterion(
    slug="probability-of-duty",
    check="duty",
    quantity="probability of making the duty",
    unit="",
    sense="at-least",
    near=0.9,
    beyond=0.5,
    source="a rule of this service",
    trust="own",
    needs=("required duty or outlet temperature",),
    caution="Maldistribution, installation and wrong geometry are not in the spread unless stated.",
)
METHOD_RANGE = Criterion(
    slug="distance-outside-range",
    check="method-range",
    quantity="distance outside a method's range over the end passed",
    unit="",
    sense="at-most",
    near=0.0,
    beyond=0.2,
    source="a rule of this service",
    trust="own",
)
CRITERIA = (DUTY, METHOD_RANGE)
