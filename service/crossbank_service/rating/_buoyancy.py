"""Whether the outside stream is driven by its fan or by its own buoyancy."""

import numpy as np

from crossbank_service.rating._arrays import Array, spread
from crossbank_service.rating._outside import mass_flux
from crossbank_service.rating._solver import Problem

GRAVITY = 9.80665
STEP_K = 0.5
"""Each side of the bulk temperature, for the slope of the density."""


def richardson(problem: Problem, bulk: Array, face: Array) -> Array:
    """Largest Gr/Re^2 of the rows.

    Parameters
    ----------
    bulk, face : Array (N, rows) or (N, 1)
        Mean bulk and surface temperature of each row, or of the bank [K].

    Returns
    -------
    Array (N,)
        [-]

    Notes
    -----
    Gr/Re^2 = g beta |T_w - T| d rho^2/G^2, d the (root) diameter, G the mass flux in the narrowest section,
    beta = -(d rho/dT)/rho; the viscosity cancels.
    """
    medium = problem.outside.medium
    pressure = spread(problem.outside.inlet_pressure, bulk)
    density = medium.at(bulk, pressure).density_kg_m3
    slope = (
        medium.at(bulk - STEP_K, pressure).density_kg_m3 - medium.at(bulk + STEP_K, pressure).density_kg_m3
    )
    expansion = np.abs(slope) / (2.0 * STEP_K * density)
    per_diameter = GRAVITY * expansion * np.abs(face - bulk) * density * density
    largest = np.zeros(bulk.shape[0])
    for section in problem.sections:
        rows = section.rows if bulk.shape[1] > 1 else slice(None)
        scale = section.bank.root_diameter / mass_flux(section, problem.outside) ** 2
        largest = np.maximum(largest, (per_diameter[:, rows] * scale[:, None]).max(axis=1))
    return largest
