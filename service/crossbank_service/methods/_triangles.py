"""Linear interpolation on a fixed triangulation of the plane, held at the nearest point of its hull."""

from dataclasses import dataclass

import numpy as np

from crossbank_service.methods.record import Array

_ROUNDING = 1e-12


@dataclass(frozen=True)
class Triangulation:
    """Nodes, triangles between them and the convex hull, as tuples of numbers.

    Attributes
    ----------
    nodes : tuple of (x, y)
        Coordinates [-].
    triangles : tuple of (int, int, int)
        Corners of each triangle; together they fill the hull.
    hull : tuple of int
        Corners of the convex hull in order.
    """

    nodes: tuple[tuple[float, float], ...]
    triangles: tuple[tuple[int, int, int], ...]
    hull: tuple[int, ...]

    def held(self, x: Array, y: Array) -> tuple[Array, Array, Array]:
        """Nearest point of the hull (the point itself inside) and the distance to it.

        Parameters
        ----------
        x, y : Array
            Coordinates [-], one shape.

        Returns
        -------
        tuple of Array
            x and y of the nearest point, distance [-] (0 inside).
        """
        outside = np.zeros(x.shape, dtype=np.bool_)
        best = np.full(x.shape, np.inf)
        near_x, near_y = x, y
        centre_x = sum(self.nodes[i][0] for i in self.hull) / len(self.hull)
        centre_y = sum(self.nodes[i][1] for i in self.hull) / len(self.hull)
        for first, second in zip(self.hull, (*self.hull[1:], self.hull[0]), strict=True):
            (x1, y1), (x2, y2) = self.nodes[first], self.nodes[second]
            along_x, along_y = x2 - x1, y2 - y1
            inner = np.sign(along_x * (centre_y - y1) - along_y * (centre_x - x1))
            outside |= inner * (along_x * (y - y1) - along_y * (x - x1)) < -_ROUNDING
            share = ((x - x1) * along_x + (y - y1) * along_y) / (along_x * along_x + along_y * along_y)
            share = np.clip(share, 0.0, 1.0)
            foot_x, foot_y = x1 + share * along_x, y1 + share * along_y
            square = np.square(x - foot_x) + np.square(y - foot_y)
            closer = square < best
            best = np.where(closer, square, best)
            near_x, near_y = np.where(closer, foot_x, near_x), np.where(closer, foot_y, near_y)
        return (
            np.where(outside, near_x, x),
            np.where(outside, near_y, y),
            np.where(outside, np.sqrt(best), 0.0),
        )

    def interpolate(self, x: Array, y: Array, values: tuple[tuple[float, ...], ...]) -> tuple[Array, ...]:
        """Linear interpolation of several tables at once.

        Parameters
        ----------
        x, y : Array
            Coordinates [-], one shape, inside the hull.
        values : tuple of tuple of float
            One tuple of node values for each table.

        Returns
        -------
        tuple of Array
            One array for each table. Where two triangles meet the first listed is taken; they agree there.
        """
        # The triangle whose smallest coordinate is the greatest holds the point, rounding or not.
        best = np.full(x.shape, -np.inf)
        results = [np.zeros(x.shape) for _ in values]
        for i, j, k in self.triangles:
            (x1, y1), (x2, y2), (x3, y3) = self.nodes[i], self.nodes[j], self.nodes[k]
            area = (y2 - y3) * (x1 - x3) + (x3 - x2) * (y1 - y3)
            first = ((y2 - y3) * (x - x3) + (x3 - x2) * (y - y3)) / area
            second = ((y3 - y1) * (x - x3) + (x1 - x3) * (y - y3)) / area
            third = 1.0 - first - second
            depth = np.minimum(np.minimum(first, second), third)
            better = depth > best
            best = np.where(better, depth, best)
            results = [
                np.where(better, first * table[i] + second * table[j] + third * table[k], result)
                for result, table in zip(results, values, strict=True)
            ]
        return tuple(results)
