"""Frequency factors of U-bends with straight legs, from a frame of straight beam elements.

Independent of the service: the bend is a polygon of Euler beams that bend and twist, clamped where the legs
end. Prints the two tables that ``beam_frequency`` holds. Run: ``python
tests/reference/generate_u_bends.py``.
"""

import numpy as np
from numpy.typing import NDArray
from scipy.linalg import block_diag, eigh

Array = NDArray[np.float64]
POISSON = 0.3
STRETCH = 1e8


def _bending(length: float) -> tuple[Array, Array]:
    h = length
    stiffness = np.array(
        [
            [12, 6 * h, -12, 6 * h],
            [6 * h, 4 * h * h, -6 * h, 2 * h * h],
            [-12, -6 * h, 12, -6 * h],
            [6 * h, 2 * h * h, -6 * h, 4 * h * h],
        ]
    )
    mass = np.array(
        [
            [156, 22 * h, 54, -13 * h],
            [22 * h, 4 * h * h, 13 * h, -3 * h * h],
            [54, 13 * h, 156, -22 * h],
            [-13 * h, -3 * h * h, -22 * h, 4 * h * h],
        ]
    )
    return stiffness / h**3, mass * h / 420.0


def factor(leg: float, elements: int, *, in_plane: bool) -> float:
    """Radian frequency for R = E I = m = 1, legs of length ``leg``, the bend in straight pieces."""
    pieces = max(2, round(elements * leg / np.pi)) if leg > 0.0 else 0
    up = [(-1.0, -leg + leg * i / pieces) for i in range(pieces)]
    bend = [(-np.cos(a), np.sin(a)) for a in np.linspace(0.0, np.pi, elements + 1)]
    down = [(1.0, -leg * (i + 1) / pieces) for i in range(pieces)]
    points = np.array(up + bend + down)
    size = 3 * len(points)
    stiffness, mass = np.zeros((2, size, size))
    for e in range(len(points) - 1):
        run = points[e + 1] - points[e]
        length = float(np.hypot(*run))
        c, s = run / length
        k, m = np.zeros((2, 6, 6))
        bending, along = ([1, 2, 4, 5], [0, 3]) if in_plane else ([0, 2, 3, 5], [1, 4])
        kb, mb = _bending(length)
        k[np.ix_(bending, bending)] = kb
        m[np.ix_(bending, bending)] = mb
        spring = STRETCH if in_plane else 1.0 / (1.0 + POISSON)
        k[np.ix_(along, along)] = spring / length * np.array([[1.0, -1.0], [-1.0, 1.0]])
        if in_plane:
            m[np.ix_(along, along)] = length / 6.0 * np.array([[2.0, 1.0], [1.0, 2.0]])
            turn = np.array([[c, s, 0.0], [-s, c, 0.0], [0.0, 0.0, 1.0]])
        else:
            turn = np.array([[1.0, 0.0, 0.0], [0.0, c, s], [0.0, s, -c]])
        both = block_diag(turn, turn)
        at = slice(3 * e, 3 * e + 6)
        stiffness[at, at] += both.T @ k @ both
        mass[at, at] += both.T @ m @ both
    free = slice(3, size - 3)
    # Largest eigenvalue of the inverse problem: the twist carries no mass.
    last = size - 7
    inverse = eigh(mass[free, free], stiffness[free, free], eigvals_only=True, subset_by_index=[last, last])
    return float(1.0 / np.sqrt(inverse[0]))


def converged(leg: float, *, in_plane: bool, elements: int = 48) -> float:
    """Two meshes, the error of the polygon taken as falling with the square of the element length."""
    coarse, fine = (factor(leg, n, in_plane=in_plane) for n in (elements, 2 * elements))
    return fine + (fine - coarse) / 3.0


if __name__ == "__main__":
    legs = 0.25 * np.arange(17)
    for plane in (False, True):
        print("in plane" if plane else "out of plane")  # noqa: T201
        print([round(converged(leg, in_plane=plane), 4) for leg in legs.tolist()])  # noqa: T201
