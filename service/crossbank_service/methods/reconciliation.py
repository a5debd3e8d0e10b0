"""Reconciliation of plant readings: weighted least squares on balances, chi-squared, suspects."""

from collections.abc import Callable
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray
from scipy import special

from crossbank_service.methods.criterion import Values
from crossbank_service.methods.record import Array

SUSPECT_AT = 1.96
"""A reading adjusted by more than this many standard deviations of the adjustment is suspect (95 %)."""


@dataclass(frozen=True, kw_only=True)
class Reconciled:
    """Readings made to fit their balances, case axis first.

    Attributes
    ----------
    values, standard_uncertainty : Array
        Reconciled values and their standard uncertainty, (cases, readings), in the units of the readings.
    chi_squared : Array
        Weighted sum of squared adjustments, (cases,).
    degrees_of_freedom : NDArray
        Independent balances, (cases,).
    chi_squared_limit : Array
        95 % point of chi-squared, (cases,); 0 where there is no balance.
    rejected : NDArray
        True where the readings contradict each other: report, do not average.
    normalised_adjustment : Array
        Adjustment over its own standard deviation, (cases, readings); 0 where no balance touches the reading.
    suspect : NDArray
        True for readings beyond ``SUSPECT_AT``.
    culprit : NDArray
        Index of the reading that alone stands out most; -1 where none is suspect or several stand out
        alike, as they always do with a single balance.
    last_step : Array
        Largest change in the last pass over the readings' uncertainty, (cases,); 0 for linear balances.
    """

    values: Array
    standard_uncertainty: Array
    chi_squared: Array
    degrees_of_freedom: NDArray[np.int64]
    chi_squared_limit: Array
    rejected: NDArray[np.bool_]
    normalised_adjustment: Array
    suspect: NDArray[np.bool_]
    culprit: NDArray[np.int64]
    last_step: Array


def _dot(a: Array, b: Array) -> Array:
    # place by place in a fixed order: a matrix product may round a case differently beside other cases
    total = a[..., 0] * b[..., 0]
    for place in range(1, a.shape[-1]):
        total = total + a[..., place] * b[..., place]
    return np.asarray(total)


def chi_squared_limit(degrees_of_freedom: NDArray[np.int64] | int, probability: float = 0.95) -> Array:
    """Point of the chi-squared distribution.

    Parameters
    ----------
    degrees_of_freedom : NDArray or int
        Degrees of freedom.
    probability : float
        Probability of staying below.

    Returns
    -------
    Array
        The point; 0 for 0 degrees of freedom.
    """
    dof = np.asarray(degrees_of_freedom, dtype=np.float64)
    return np.where(dof > 0.0, special.chdtri(np.maximum(dof, 1.0), 1.0 - probability), 0.0)


def reconcile_linear(
    readings: Array, standard_uncertainty: Array, balances: Array, totals: Values = 0.0
) -> Reconciled:
    """Fit readings to linear balances by weighted least squares.

    Parameters
    ----------
    readings, standard_uncertainty : Array
        Readings and their standard uncertainties, (cases, readings). A quantity that is only estimated,
        such as the loss of the casing, is a reading too, with its own uncertainty.
    balances : Array
        Coefficients A of A x = b, (balances, readings) or (cases, balances, readings).
    totals : Array or float
        b, broadcast to (cases, balances).

    Returns
    -------
    Reconciled
        Fitted values, tests and suspects.

    Notes
    -----
    x = y - V A' W^-1 r, V_x = V - V A' W^-1 A V, chi2 = r' W^-1 r with W = A V A', r = A y - b (Narasimhan
    & Jordache, Data Reconciliation and Gross Error Detection). The balances are taken one after another,
    each updating values and covariance, which is the same in exact arithmetic and needs no matrix inverse;
    a balance that the ones before it already imply is passed over.
    """
    y = np.atleast_2d(np.asarray(readings, dtype=np.float64))
    u = np.broadcast_to(np.asarray(standard_uncertainty, dtype=np.float64), y.shape)
    cases, count = y.shape
    matrix = np.broadcast_to(np.asarray(balances, dtype=np.float64), (cases, *np.shape(balances)[-2:]))
    b = np.broadcast_to(np.asarray(totals, dtype=np.float64), matrix.shape[:2])
    x = y.copy()
    covariance = np.zeros((cases, count, count))
    covariance[:, np.arange(count), np.arange(count)] = u**2
    chi = np.zeros(cases)
    dof = np.zeros(cases, dtype=np.int64)
    for number in range(matrix.shape[1]):
        row = matrix[:, number, :]
        residual = _dot(row, x) - b[:, number]
        spread = _dot(covariance, row[:, np.newaxis, :])
        variance = _dot(row, spread)
        # what is left of the balance's variance after the ones before it, against what it had on its own
        independent = variance > 1e-10 * _dot(row**2, u**2)
        safe = np.where(independent, variance, 1.0)
        gain = np.where(independent[:, np.newaxis], spread / safe[:, np.newaxis], 0.0)
        x = x - gain * residual[:, np.newaxis]
        covariance = covariance - gain[:, :, np.newaxis] * spread[:, np.newaxis, :]
        chi = chi + np.where(independent, residual**2 / safe, 0.0)
        dof = dof + independent
    left = np.clip(covariance[:, np.arange(count), np.arange(count)], 0.0, u**2)
    return _tested(y, u, x, left, chi, dof, np.zeros(cases))


def _tested(
    y: Array, u: Array, x: Array, variance: Array, chi: Array, dof: NDArray[np.int64], step: Array
) -> Reconciled:
    adjusted = u**2 - variance
    moved = adjusted > 1e-10 * u**2
    z = np.where(moved, (y - x) / np.sqrt(np.where(moved, adjusted, 1.0)), 0.0)
    size = np.abs(z)
    suspect = size > SUSPECT_AT
    first = np.argmax(size, axis=-1)
    most = size.max(axis=-1)
    alike = np.count_nonzero(size > (1.0 - 1e-6) * most[:, np.newaxis], axis=-1)
    limit = chi_squared_limit(dof)
    return Reconciled(
        values=x,
        standard_uncertainty=np.sqrt(variance),
        chi_squared=chi,
        degrees_of_freedom=dof,
        chi_squared_limit=limit,
        rejected=(dof > 0) & (chi > limit),
        normalised_adjustment=z,
        suspect=suspect,
        culprit=np.where(suspect.any(axis=-1) & (alike == 1), first, -1),
        last_step=step,
    )


def reconcile(
    readings: Array,
    standard_uncertainty: Array,
    balances: Callable[[Array], tuple[Array, Array]],
    passes: int = 8,
) -> Reconciled:
    """Fit readings to balances that are not linear, such as flow times heat capacity times difference.

    Parameters
    ----------
    readings, standard_uncertainty : Array
        Readings and their standard uncertainties, (cases, readings).
    balances : callable
        Takes values (cases, readings), returns residuals (cases, balances) and their derivatives
        (cases, balances, readings).
    passes : int
        Passes; 3 to 5 are usual, and ``last_step`` tells whether they were enough.

    Returns
    -------
    Reconciled
        Fitted values, tests and suspects.

    Notes
    -----
    Each pass fits the readings, not the last values, to the balances made straight at the last values.
    """
    y = np.atleast_2d(np.asarray(readings, dtype=np.float64))
    u = np.broadcast_to(np.asarray(standard_uncertainty, dtype=np.float64), y.shape)

    def fit_at(x: Array) -> tuple[Reconciled, Array]:
        residual, slope = balances(x)
        fitted = reconcile_linear(y, u, slope, _dot(slope, x[:, np.newaxis, :]) - residual)
        moved = np.abs(fitted.values - x) / np.where(u > 0.0, u, 1.0)
        return fitted, np.asarray(moved.max(axis=-1))

    fitted, step = fit_at(y)
    for _ in range(passes - 1):
        fitted, step = fit_at(fitted.values)
    return _tested(
        y,
        u,
        fitted.values,
        fitted.standard_uncertainty**2,
        fitted.chi_squared,
        fitted.degrees_of_freedom,
        step,
    )


def reconcile_two_sides(
    first_duty_w: Values, first_uncertainty_w: Values, second_duty_w: Values, second_uncertainty_w: Values
) -> Reconciled:
    """Bring the duties of the two sides of an exchanger together.

    Parameters
    ----------
    first_duty_w, first_uncertainty_w : array_like
        Duty of one side and its standard uncertainty [W].
    second_duty_w, second_uncertainty_w : array_like
        Duty of the other side, losses included, and its standard uncertainty [W].

    Returns
    -------
    Reconciled
        With two readings a case; both values are the weighted mean.

    Notes
    -----
    Q = (Q1/u1^2 + Q2/u2^2)/(1/u1^2 + 1/u2^2). One balance: which side is wrong cannot be told.
    """
    q1, u1, q2, u2 = np.broadcast_arrays(
        *(
            np.atleast_1d(np.asarray(v, dtype=np.float64))
            for v in (first_duty_w, first_uncertainty_w, second_duty_w, second_uncertainty_w)
        )
    )
    return reconcile_linear(np.stack([q1, q2], axis=-1), np.stack([u1, u2], axis=-1), np.array([[1.0, -1.0]]))
