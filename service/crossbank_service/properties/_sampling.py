"""Reading transport properties off reference equations that fail here and there."""

from collections.abc import Callable

import numpy as np
from scipy.interpolate import make_interp_spline

from crossbank_service.properties.medium import Array

_MOST_MISSING = 0.2


def logarithm(read: Callable[[], float]) -> float:
    """Logarithm of a property; NaN where the equation finds no solution or none that is positive."""
    try:
        value = read()
    except ValueError:
        return np.nan
    return float(np.log(value)) if value > 0.0 else np.nan


def fill_line(name: str, x: Array, values: Array) -> None:
    """Fill in the missing values of one quantity along a line from its neighbours, in place."""
    missing = np.isnan(values)
    if np.mean(missing) > _MOST_MISSING:
        raise ValueError(f"no transport properties in {np.mean(missing):.0%} of a table of {name}")
    if missing.any():
        order = np.argsort(x[~missing])
        spline = make_interp_spline(x[~missing][order], values[~missing][order], k=3)
        values[missing] = spline(x[missing])


def fill_grid(name: str, x: Array, y: Array, values: Array) -> None:
    """Fill in the missing nodes of one quantity on a grid from their neighbours, in place.

    Extended-corresponding-states transport equations fail at scattered states of some refrigerants' gas.
    The quantity is smooth, so the other nodes of the row, or else of the column, carry it.
    """
    missing = np.isnan(values)
    if np.mean(missing) > _MOST_MISSING:
        raise ValueError(f"no transport properties in {np.mean(missing):.0%} of a table of {name}")
    for i in range(values.shape[0]):
        if 0.0 < np.mean(np.isnan(values[i])) <= _MOST_MISSING:
            fill_line(name, y, values[i])
    for j in range(values.shape[1]):
        fill_line(name, x, values[:, j])
