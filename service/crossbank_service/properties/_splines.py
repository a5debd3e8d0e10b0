"""Splines over one or two coordinates, several quantities at once."""

import numpy as np
from scipy.interpolate import BSpline, NdBSpline, make_interp_spline

from crossbank_service.properties.medium import Array


class Spline1:
    """Interpolating spline of M quantities over one coordinate; coordinates outside are clipped."""

    def __init__(self, x: Array, values: Array, degree: int = 5) -> None:
        order = np.argsort(x)
        x, values = x[order], values[order]
        self.low, self.high = float(x[0]), float(x[-1])
        self._spline: BSpline = make_interp_spline(x, values, k=degree, axis=0)

    def __call__(self, x: Array) -> Array:
        """Quantities at ``x`` of shape (...); the result has shape (..., M), or (...) for a single one."""
        return np.asarray(self._spline(np.clip(x, self.low, self.high)))


class Spline2:
    """Tensor-product interpolating spline of M quantities over two coordinates, clipped outside."""

    def __init__(self, x: Array, y: Array, values: Array, degree: int = 5) -> None:
        order_x, order_y = np.argsort(x), np.argsort(y)
        x, y, values = x[order_x], y[order_y], values[order_x][:, order_y]
        self._low, self._high = np.array([x[0], y[0]]), np.array([x[-1], y[-1]])
        along_x = make_interp_spline(x, values, k=degree, axis=0)
        along_y = make_interp_spline(y, np.moveaxis(along_x.c, 1, 0), k=degree, axis=0)
        self._spline = NdBSpline(
            (along_x.t, along_y.t), np.ascontiguousarray(np.moveaxis(along_y.c, 0, 1)), degree
        )

    def __call__(self, x: Array, y: Array) -> Array:
        """Quantities at flat ``x`` and ``y`` of shape (P,); the result has shape (M, P)."""
        points = np.clip(np.stack((x, y), axis=-1), self._low, self._high)
        return np.ascontiguousarray(np.moveaxis(self._spline(points), -1, 0))


def lobatto(low: float, high: float, count: int) -> Array:
    """Chebyshev-Lobatto points from ``low`` to ``high``, crowded towards both ends."""
    return low + (high - low) * 0.5 * (1.0 - np.cos(np.pi * np.linspace(0.0, 1.0, count)))
