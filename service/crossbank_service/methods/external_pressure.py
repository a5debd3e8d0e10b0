"""Tubes under external pressure: collapse of a long tube, as a screening and never a code calculation."""

import numpy as np

from crossbank_service.methods.criterion import Criterion, Values
from crossbank_service.methods.pressure_walls import PRESSURE_CAUTION
from crossbank_service.methods.record import Array


def elastic_collapse_pa(
    outer_diameter_m: Values, wall_m: Values, elastic_modulus_pa: Values, poisson: Values = 0.3
) -> Array:
    """Elastic buckling pressure of a long tube under external pressure.

    Parameters
    ----------
    outer_diameter_m, wall_m : array_like
        Outer diameter and corroded, under-tolerance wall [m].
    elastic_modulus_pa : array_like
        Young's modulus at the metal temperature [Pa].
    poisson : array_like
        Poisson's ratio.

    Returns
    -------
    Array
        Pressure [Pa].

    Notes
    -----
    p = 2 E/(1 - nu^2) (t/(D - t))^3: the two-lobed mode of a ring held in plane strain (Bresse, Bryan).
    """
    outer, wall = np.asarray(outer_diameter_m, dtype=np.float64), np.asarray(wall_m, dtype=np.float64)
    slender = wall / np.maximum(outer - wall, 1e-9)
    return np.asarray(2.0 * np.asarray(elastic_modulus_pa) / (1.0 - np.asarray(poisson) ** 2) * slender**3)


def collapse_pressure_pa(
    outer_diameter_m: Values,
    wall_m: Values,
    elastic_modulus_pa: Values,
    yield_stress_pa: Values,
    poisson: Values = 0.3,
) -> Array:
    """Collapse pressure of a long, nearly round tube.

    Parameters
    ----------
    outer_diameter_m, wall_m : array_like
        Outer diameter and corroded, under-tolerance wall [m].
    elastic_modulus_pa, yield_stress_pa : array_like
        Young's modulus and yield stress at the metal temperature [Pa].
    poisson : array_like
        Poisson's ratio.

    Returns
    -------
    Array
        Pressure [Pa].

    Notes
    -----
    1/p = 1/p_el + 1/p_y with p_y = 2 sy t/D (reciprocal blend, rule of this service). Ovality above 1 % is
    not covered.
    """
    outer, wall = np.asarray(outer_diameter_m, dtype=np.float64), np.asarray(wall_m, dtype=np.float64)
    elastic = elastic_collapse_pa(outer, wall, elastic_modulus_pa, poisson)
    plastic = 2.0 * np.asarray(yield_stress_pa) * wall / outer
    both = elastic + plastic
    return np.where(both > 0.0, elastic * plastic / np.where(both > 0.0, both, 1.0), 0.0)


def wall_for_external_pressure_m(
    pressure_pa: Values,
    outer_diameter_m: Values,
    elastic_modulus_pa: Values,
    yield_stress_pa: Values,
    poisson: Values = 0.3,
    safety: float = 4.0,
) -> Array:
    """Wall before allowances that holds an external pressure with a wanted safety: the remedy.

    Parameters
    ----------
    pressure_pa : array_like
        External pressure over internal [Pa].
    outer_diameter_m : array_like
        Outer diameter [m].
    elastic_modulus_pa, yield_stress_pa : array_like
        Young's modulus and yield stress at the metal temperature [Pa].
    poisson : array_like
        Poisson's ratio.
    safety : float
        Wanted ratio of collapse to external pressure.

    Returns
    -------
    Array
        Wall [m], at most half the outer diameter: then no tube of this size will do.

    Notes
    -----
    Collapse rises with the wall: halved 60 times.
    """
    wanted = safety * np.asarray(pressure_pa, dtype=np.float64)
    outer, modulus, strength, nu, wanted = np.broadcast_arrays(
        np.asarray(outer_diameter_m, dtype=np.float64), elastic_modulus_pa, yield_stress_pa, poisson, wanted
    )
    low, high = np.zeros(outer.shape), 0.5 * outer
    for _ in range(60):
        middle = 0.5 * (low + high)
        holds = collapse_pressure_pa(outer, middle, modulus, strength, nu) >= wanted
        low, high = np.where(holds, low, middle), np.where(holds, middle, high)
    return np.asarray(high)


EXTERNAL = Criterion(
    slug="long-tube-collapse",
    check="tube-external-pressure",
    quantity="collapse over external pressure",
    unit="",
    sense="at-least",
    beyond=3.0,
    near=4.0,
    source="long-tube buckling and yield blended; code practice uses charts",
    trust="own",
    needs=("external design pressure", "Young's modulus", "yield stress"),
    caution=PRESSURE_CAUTION,
)
CRITERIA = (EXTERNAL,)
