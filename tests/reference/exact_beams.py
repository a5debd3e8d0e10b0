"""Natural frequencies of continuous beams from the exact solution in every span, without elements.

Independent of the service: w = sum of two decaying exponentials, a cosine and a sine in each span, joined
at the supports; the roots of the determinant are the frequencies.
"""

import numpy as np
from numpy.typing import NDArray
from scipy.optimize import brentq

Array = NDArray[np.float64]


def _waves(length: float, omega: float, tension: float) -> tuple[Array, Array, Array, Array, Array, Array]:
    """w, w', w'' of the four waves at both ends of a span with E I = m = 1."""
    root = np.sqrt(0.25 * tension**2 + omega**2)
    decay, wave = np.sqrt(root + 0.5 * tension), np.sqrt(root - 0.5 * tension)
    gone = np.exp(-decay * length)
    c, s = np.cos(wave * length), np.sin(wave * length)
    at_start = (
        np.array([1.0, gone, 1.0, 0.0]),
        np.array([-decay, decay * gone, 0.0, wave]),
        np.array([decay**2, decay**2 * gone, -(wave**2), 0.0]),
    )
    at_end = (
        np.array([gone, 1.0, c, s]),
        np.array([-decay * gone, decay, -wave * s, wave * c]),
        np.array([decay**2 * gone, decay**2, -(wave**2) * c, -(wave**2) * s]),
    )
    return (*at_start, *at_end)


def _determinant(omega: float, spans: list[float], tension: float, fixed: tuple[bool, bool]) -> float:
    n = len(spans)
    matrix = np.zeros((4 * n, 4 * n))
    row = 0
    for i, length in enumerate(spans):
        w0, d0, c0, w1, d1, c1 = _waves(length, omega, tension)
        own = slice(4 * i, 4 * i + 4)
        matrix[row, own], matrix[row + 1, own] = w0, w1
        row += 2
        if i == 0:
            matrix[row, own] = d0 if fixed[0] else c0
            row += 1
        if i == n - 1:
            matrix[row, own] = d1 if fixed[1] else c1
            row += 1
        else:
            _, d, c, _, _, _ = _waves(spans[i + 1], omega, tension)
            following = slice(4 * i + 4, 4 * i + 8)
            matrix[row, own], matrix[row, following] = d1, -d
            matrix[row + 1, own], matrix[row + 1, following] = c1, -c
            row += 2
    scale = np.max(np.abs(matrix), axis=1, keepdims=True)
    return float(np.linalg.det(matrix / scale))


def exact_frequencies(
    spans: list[float],
    stiffness: float,
    mass: float,
    *,
    fixed: tuple[bool, bool],
    axial_force: float = 0.0,
    modes: int = 4,
) -> list[float]:
    """Lowest frequencies [Hz] of a beam on point supports; spans [m], E I [N m2], m [kg/m], N [N]."""
    size = max(spans)
    scaled = [length / size for length in spans]
    tension = axial_force * size**2 / stiffness
    # Steps in the square root of omega: roots of beams are about evenly spaced in it.
    grid = np.arange(0.2, 4.74 * (modes + 2), 0.008) ** 2
    values = [_determinant(omega, scaled, tension, fixed) for omega in grid.tolist()]
    roots: list[float] = []
    for i in range(len(grid) - 1):
        if values[i] * values[i + 1] < 0.0:
            arguments = (scaled, tension, fixed)
            roots.append(brentq(_determinant, grid[i], grid[i + 1], args=arguments, xtol=1e-13, rtol=1e-14))
        if len(roots) == modes:
            break
    return [root / (2.0 * np.pi * size**2) * float(np.sqrt(stiffness / mass)) for root in roots]
