"""Smooth passages between laws that hold in neighbouring ranges, and the wrapper every correlation wears."""

from collections.abc import Callable, Sequence
from functools import wraps

import numpy as np
from numpy.typing import ArrayLike

from crossbank_service.methods.record import Array

JOIN_FACTOR = 1.4
LEAST_REYNOLDS = 1e-6


def elementwise(function: Callable[..., Array]) -> Callable[..., Array]:
    """Let a correlation take floats, words of truth or arrays that broadcast together.

    Parameters
    ----------
    function : callable
        Takes keyword arguments that are float64 arrays of at least one axis (None stays None).

    Returns
    -------
    callable
        The same function on anything array-like; the result has the broadcast shape of all arguments.

    Notes
    -----
    Numpy computes a power of a lone number by another routine than a power of an array, and the two may
    differ in the last bit. Every argument therefore has an axis before the arithmetic begins, so that a case
    gives the same bits alone and among others.
    """

    @wraps(function)
    def evaluate(**quantities: ArrayLike | None) -> Array:
        arrays = {
            name: None if value is None else np.asarray(value, dtype=np.float64)
            for name, value in quantities.items()
        }
        shape = np.broadcast_shapes(*(array.shape for array in arrays.values() if array is not None))
        result = function(
            **{name: None if array is None else np.atleast_1d(array) for name, array in arrays.items()}
        )
        if shape and result.shape != shape:
            return np.broadcast_to(result, shape).copy()
        return result.reshape(shape)

    return evaluate


def log_reynolds(reynolds: Array) -> Array:
    """Natural logarithm of a Reynolds number, held at 1e-6 so that standing fluid stays finite."""
    return np.log(np.maximum(reynolds, LEAST_REYNOLDS))


def smoothstep(share: Array) -> Array:
    """Cubic 3 t^2 - 2 t^3 of a share t held in 0..1: exactly 0 and 1 outside, level at both ends."""
    t = np.clip(share, 0.0, 1.0)
    return t * t * (3.0 - 2.0 * t)


def rise(logarithm: Array, low: float, high: float) -> Array:
    """Weight that rises smoothly from 0 at ``low`` to 1 at ``high``, in the logarithm of the quantity."""
    start = np.log(low)
    return smoothstep((logarithm - start) / (np.log(high) - start))


def joined(logarithm: Array, logs: Sequence[Array], joins: Sequence[float]) -> Array:
    """Logarithm of a quantity given by neighbouring laws, each join passed smoothly within a factor 1.4.

    Parameters
    ----------
    logarithm : Array
        ln Re [-].
    logs : sequence of Array
        Logarithm of each law [-], from the lowest range to the highest.
    joins : sequence of float
        The Reynolds numbers [-] between them; one less than the laws.

    Returns
    -------
    Array
        Logarithm of the result.

    Notes
    -----
    The published sets jump by up to 27 % at their joins, which no solver can pass. The passage is this
    library's choice and common practice; away from the joins every law is as published.
    """
    result = logs[0]
    for law, join in zip(logs[1:], joins, strict=True):
        weight = rise(logarithm, join / JOIN_FACTOR, join * JOIN_FACTOR)
        result = (1.0 - weight) * result + weight * law
    return result


def geometric(first: Array, second: Array, weight: Array) -> Array:
    """first^(1-weight) second^weight of positive quantities, bit for bit either one at weight 0 or 1."""
    mixed = np.exp((1.0 - weight) * np.log(first) + weight * np.log(second))
    return np.where(weight <= 0.0, first, np.where(weight >= 1.0, second, mixed))
