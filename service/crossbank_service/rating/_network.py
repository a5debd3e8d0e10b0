"""The heat balance of the cell grid: rows along the outside stream times segments along the tubes.

In a cell the outside stream is unmixed along the tube and the inside stream is mixed over the bore. With constant
conductance and capacity rates inside the cell its balance is exact::

    k = 1 - exp(-UA/C_o) ;  e = (1 - exp(-k C_o/C_i)) / (k C_o/C_i)
    q = C_o k e (t_in - T_in) ;  T_out = T_in + q/C_o ;  t_out = t_in - q/C_i

Given the conductances the whole grid is linear; it is solved at once, by carrying every temperature as an affine
function of the unknown inlet temperatures of the later passes.
"""

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from crossbank_service.rating._arrays import Cases
from crossbank_service.rating._circuit import Circuit

Array = NDArray[np.float64]


@dataclass(frozen=True)
class Field(Cases):
    """Temperatures and heat of the grid; arrays of shape (N, rows, segments), K and W.

    ``heat`` is positive when the outside stream gains. ``inside_in`` and ``inside_out`` follow the inside stream
    through the cell, ``inside_mean`` is its exact mean over the cell.
    """

    outside_in: Array
    outside_out: Array
    inside_in: Array
    inside_out: Array
    inside_mean: Array
    heat: Array


def relaxation(exponent: Array) -> Array:
    """(1 - exp(-x))/x, exact at 0."""
    tiny = exponent < 1e-10
    safe = np.where(tiny, 1.0, exponent)
    return np.where(tiny, 1.0 - 0.5 * exponent, -np.expm1(-safe) / safe)


def solve_known_inside(ua: Array, c_outside: Array, outside_inlet: Array, inside: Array) -> Field:
    """Solve the grid for inside temperatures that are known: a held surface, or saturated vapour.

    Parameters
    ----------
    ua : Array (N, rows, segments)
        Conductance of each cell [W/K].
    c_outside : Array (N, rows, segments)
        Capacity rate of the outside stream through each cell [W/K].
    outside_inlet : Array (N,)
        [K]
    inside : Array (N, rows, segments)
        Inside temperature of each cell [K].
    """
    k = -np.expm1(-ua / c_outside)
    entering = np.empty_like(ua)
    leaving = np.empty_like(ua)
    stream = np.repeat(outside_inlet[:, None], ua.shape[2], axis=1)
    for r in range(ua.shape[1]):
        entering[:, r] = stream
        stream = stream + k[:, r] * (inside[:, r] - stream)
        leaving[:, r] = stream
    return Field(entering, leaving, inside, inside, inside, c_outside * k * (inside - entering))


def solve_passes(
    ua: Array,
    c_outside: Array,
    c_inside: Array,
    outside_inlet: Array,
    inside_inlet: Array,
    mixing: Array,
    circuit: Circuit,
) -> Field:
    """Solve the grid for an inside stream that passes through the rows and mixes between passes.

    Parameters
    ----------
    ua, c_outside, c_inside : Array (N, rows, segments)
        Conductance and capacity rates of the streams through each cell [W/K].
    outside_inlet, inside_inlet : Array (N,)
        [K]
    mixing : Array (N, passes)
        What mixing by enthalpy adds to the plain mean of a pass's outlet temperatures [K].
    circuit : Circuit
        Rows of a pass share the stream evenly.
    """
    n, rows, segments = ua.shape
    passes = circuit.passes
    k = -np.expm1(-ua / c_outside)
    e = relaxation(k * c_outside / c_inside)
    to_outside = k * e  # dT_outside / (t_in - T_in)
    to_inside = to_outside * c_outside / c_inside

    # temperatures as affine functions of the pass inlets: component p multiplies the inlet temperature of pass p
    inlet_out = np.zeros((n, rows, segments, passes + 1))
    inlet_in = np.zeros((n, rows, segments, passes + 1))
    row_end = np.zeros((n, rows, passes + 1))
    stream = np.zeros((n, segments, passes + 1))
    stream[:, :, passes] = outside_inlet[:, None]
    for r, p in enumerate(circuit.pass_of_row):
        # in a counter arrangement a row knows of its own pass, of later ones and of the outside inlet only
        known = slice(p if circuit.against else 0, passes + 1)
        tube = np.zeros((n, passes + 1))[:, known]
        tube[:, p - known.start] = 1.0
        flowing = stream[:, :, known]
        inlet_out[:, r, :, known] = flowing
        outwards, inwards = to_outside[:, r, :, None], to_inside[:, r, :, None]
        order = range(segments - 1, -1, -1) if circuit.backwards(p) else range(segments)
        for s in order:
            inlet_in[:, r, s, known] = tube
            difference = tube - flowing[:, s]
            flowing[:, s] += outwards[:, s] * difference
            tube = tube - inwards[:, s] * difference
        row_end[:, r, known] = tube

    basis = np.empty((n, passes + 1))
    basis[:, 0] = inside_inlet
    basis[:, passes] = 1.0
    if passes > 1:
        matrix = np.zeros((n, passes - 1, passes - 1))
        right = np.zeros((n, passes - 1))
        for p in range(passes - 1):
            members = circuit.rows_of_pass[p]
            mean = row_end[:, members[0]].copy()
            for r in members[1:]:
                mean += row_end[:, r]
            mean /= len(members)
            # inlet of pass p+1 less its share in the mean outlet of pass p
            matrix[:, p, p] += 1.0
            matrix[:, p] -= mean[:, 1:passes]
            right[:, p] = mean[:, passes] + mean[:, 0] * inside_inlet + mixing[:, p]
        basis[:, 1:passes] = np.linalg.solve(matrix, right[..., None])[..., 0]

    def at(parts: Array) -> Array:
        total = np.zeros(parts.shape[:-1])
        for c in range(passes + 1):
            total += parts[..., c] * basis[:, c].reshape((n,) + (1,) * (parts.ndim - 2))
        return total

    t_out_in = at(inlet_out)
    t_in_in = at(inlet_in)
    difference = t_in_in - t_out_in
    return Field(
        outside_in=t_out_in,
        outside_out=t_out_in + to_outside * difference,
        inside_in=t_in_in,
        inside_out=t_in_in - to_inside * difference,
        inside_mean=t_out_in + e * difference,
        heat=c_outside * to_outside * difference,
    )
