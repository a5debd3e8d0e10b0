"""Array helpers shared by the media: spreading a case's parameter, and a caller's curves."""

from collections.abc import Sequence
from dataclasses import dataclass
from typing import Any, Self

import numpy as np
from numpy.typing import NDArray

from crossbank_service.properties.medium import Array


def spread(parameter: NDArray[Any], like: Array) -> NDArray[Any]:
    """Reshape a parameter of shape (N,) so that it broadcasts over the trailing axes of ``like``."""
    return parameter.reshape(parameter.shape + (1,) * (like.ndim - parameter.ndim))


@dataclass(frozen=True, slots=True)
class Curve:
    """N curves given by points, linear between the points and held at the end values outside.

    Attributes
    ----------
    x : Array
        Abscissae of shape (N, K), rising along the last axis; a curve with fewer than K points is filled up
        with ``inf``, which no lookup ever reaches, so a curve's values do not depend on the others'.
    y : Array
        Ordinates of shape (N, K); filled up with the last ordinate.

    Notes
    -----
    A curve of one point is that constant, exactly.
    """

    x: Array
    y: Array

    @classmethod
    def of(cls, points: Sequence[tuple[Sequence[float], Sequence[float]]]) -> Self:
        """Build from one (abscissae, ordinates) pair a case."""
        x = pad([p[0] for p in points], np.inf)
        y = pad([p[1] for p in points], None)
        return cls(x, y)

    @classmethod
    def constant(cls, values: Array) -> Self:
        """Curves of one point each, from values of shape (N,)."""
        return cls(np.zeros((len(values), 1)), np.asarray(values, dtype=np.float64)[:, None])

    def __call__(self, x: Array) -> Array:
        """Ordinates at ``x`` of shape (N, ...)."""
        index, weight = locate(self.x, x)
        low, high = pick(self.y, index), pick(self.y, index + 1)
        return np.asarray(low + weight * (high - low))

    def take(self, index: NDArray[np.intp]) -> Self:
        """Select cases by index."""
        return type(self)(self.x[index], self.y[index])


def pad(rows: Sequence[Sequence[float]], fill: float | None) -> Array:
    """Rows of unequal length as one array, filled up with ``fill`` (None: each row's last value)."""
    width = max(len(row) for row in rows)
    out = np.empty((len(rows), width))
    for i, row in enumerate(rows):
        out[i, : len(row)] = row
        out[i, len(row) :] = row[-1] if fill is None else fill
    return out


def locate(nodes: Array, x: Array) -> tuple[NDArray[np.intp], Array]:
    """Interval and position within it, of ``x`` (N, ...) among ``nodes`` (N, K) filled up with ``inf``.

    Returns
    -------
    index : integer array
        The interval is from node ``index`` to ``index + 1``; for a single node ``index`` is 0.
    weight : Array
        0 at the lower node, 1 at the upper one, clipped to that; 0 for a single node.
    """
    cases, width = nodes.shape
    last = np.maximum(np.sum(np.isfinite(nodes), axis=1) - 2, 0)
    index = np.zeros(x.shape, dtype=np.intp)
    for k in range(1, width - 1):  # over the nodes of a curve, few
        index += x >= spread(nodes[:, k], x)
    index = np.minimum(index, last.reshape((cases,) + (1,) * (x.ndim - 1)))
    low, high = pick(nodes, index), pick(nodes, index + 1)
    single = ~np.isfinite(high) | (high <= low)
    width_x = np.where(single, 1.0, np.where(single, 0.0, high) - low)
    weight = np.where(single, 0.0, np.clip((x - low) / width_x, 0.0, 1.0))
    return index, weight


def pick(values: Array, index: NDArray[np.intp]) -> Array:
    """Elements of ``values`` (N, K) at ``index`` (N, ...); an index past the end means the last one."""
    cases, width = values.shape
    flat = np.minimum(index, width - 1).reshape(cases, -1)
    return np.take_along_axis(values, flat, axis=1).reshape(index.shape)
