"""Walls under internal pressure: a screening, never a code calculation."""

import numpy as np

from crossbank_service.methods.criterion import Criterion, Values
from crossbank_service.methods.record import Array


def wall_outside_form_m(
    pressure_pa: Values,
    outer_diameter_m: Values,
    stress_pa: Values,
    joint_efficiency: Values = 1.0,
) -> Array:
    """Wall required from the outer diameter, thin shells.

    Parameters
    ----------
    pressure_pa : array_like
        Internal pressure, gauge [Pa].
    outer_diameter_m : array_like
        Outer diameter [m].
    stress_pa : array_like
        Allowable stress at the design temperature [Pa].
    joint_efficiency : array_like
        Joint efficiency, 0 to 1.

    Returns
    -------
    Array
        Wall before allowances [m].

    Notes
    -----
    t = P Ro/(S E + 0.4 P). ASME BPVC VIII-1, Appendix 1-1; for t < Ri/2 and P < 0.385 S E.
    """
    strength = np.asarray(stress_pa, dtype=np.float64) * joint_efficiency
    return np.asarray(
        pressure_pa * (0.5 * np.asarray(outer_diameter_m)) / (strength + 0.4 * np.asarray(pressure_pa))
    )


def wall_inside_form_m(
    pressure_pa: Values,
    inner_diameter_m: Values,
    stress_pa: Values,
    joint_efficiency: Values = 1.0,
) -> Array:
    """Wall required from the inner diameter, thin shells.

    Parameters
    ----------
    pressure_pa : array_like
        Internal pressure, gauge, below 0.385 of the strength [Pa].
    inner_diameter_m : array_like
        Inner diameter [m].
    stress_pa : array_like
        Allowable stress at the design temperature [Pa].
    joint_efficiency : array_like
        Joint efficiency, 0 to 1.

    Returns
    -------
    Array
        Wall before allowances [m].

    Notes
    -----
    t = P Ri/(S E - 0.6 P). ASME BPVC VIII-1, UG-27(c)(1). The divisor is kept above a tenth of the
    strength, where the form has long lost its meaning.
    """
    strength = np.asarray(stress_pa, dtype=np.float64) * joint_efficiency
    left = np.maximum(strength - 0.6 * np.asarray(pressure_pa), 0.1 * strength)
    return np.asarray(pressure_pa * (0.5 * np.asarray(inner_diameter_m)) / left)


def wall_longitudinal_m(
    pressure_pa: Values,
    inner_diameter_m: Values,
    stress_pa: Values,
    joint_efficiency: Values = 1.0,
) -> Array:
    """Wall required against the pull of the pressure on the closed ends.

    Parameters
    ----------
    pressure_pa : array_like
        Internal pressure, gauge [Pa].
    inner_diameter_m : array_like
        Inner diameter [m].
    stress_pa : array_like
        Allowable stress at the design temperature [Pa].
    joint_efficiency : array_like
        Efficiency of the circumferential joint, 0 to 1.

    Returns
    -------
    Array
        Wall before allowances [m]; rarely governs.

    Notes
    -----
    t = P Ri/(2 S E + 0.4 P). ASME BPVC VIII-1, UG-27(c)(2).
    """
    strength = np.asarray(stress_pa, dtype=np.float64) * joint_efficiency
    inner_radius = 0.5 * np.asarray(inner_diameter_m)
    return np.asarray(pressure_pa * inner_radius / (2.0 * strength + 0.4 * np.asarray(pressure_pa)))


def wall_en_13445_m(
    pressure_pa: Values,
    outer_diameter_m: Values,
    stress_pa: Values,
    weld_coefficient: Values = 1.0,
) -> Array:
    """Wall required after EN 13445-3, as a second opinion.

    Parameters
    ----------
    pressure_pa : array_like
        Internal pressure, gauge [Pa].
    outer_diameter_m : array_like
        Outer diameter [m].
    stress_pa : array_like
        Nominal design stress [Pa].
    weld_coefficient : array_like
        Weld coefficient, 0 to 1.

    Returns
    -------
    Array
        Wall before allowances [m].

    Notes
    -----
    e = P De/(2 f z + P). EN 13445-3, cylindrical shells (from memory; equal to the mean-diameter formula).
    """
    strength = np.asarray(stress_pa, dtype=np.float64) * weld_coefficient
    return np.asarray(pressure_pa * np.asarray(outer_diameter_m) / (2.0 * strength + np.asarray(pressure_pa)))


def wall_lame_m(
    pressure_pa: Values,
    outer_diameter_m: Values,
    stress_pa: Values,
    joint_efficiency: Values = 1.0,
) -> Array:
    """Wall required by the exact elastic hoop stress at the bore.

    Parameters
    ----------
    pressure_pa : array_like
        Internal pressure, gauge [Pa].
    outer_diameter_m : array_like
        Outer diameter [m].
    stress_pa : array_like
        Allowable stress at the design temperature [Pa].
    joint_efficiency : array_like
        Joint efficiency, 0 to 1.

    Returns
    -------
    Array
        Wall before allowances [m]; the whole radius where no wall can hold the pressure.

    Notes
    -----
    Lame: hoop stress at the bore = P (Ro^2 + Ri^2)/(Ro^2 - Ri^2) = S E, so t = Ro (1 - sqrt((S E - P)/(S E
    + P))).
    """
    strength = np.asarray(stress_pa, dtype=np.float64) * joint_efficiency
    left = np.maximum(strength - pressure_pa, 0.0) / (strength + pressure_pa)
    return np.asarray(0.5 * np.asarray(outer_diameter_m) * (1.0 - np.sqrt(left)))


def required_wall_m(
    pressure_pa: Values,
    outer_diameter_m: Values,
    stress_pa: Values,
    joint_efficiency: Values = 1.0,
) -> Array:
    """Wall required: the outside form where it holds, Lame beyond.

    Parameters
    ----------
    pressure_pa : array_like
        Internal pressure, gauge [Pa].
    outer_diameter_m : array_like
        Outer diameter [m].
    stress_pa : array_like
        Allowable stress at the design temperature, always the caller's [Pa].
    joint_efficiency : array_like
        Joint efficiency, 0 to 1.

    Returns
    -------
    Array
        Wall before allowances [m].

    Notes
    -----
    The two meet at P = 0.385 S E to 0.01 %. Below it the outside form is up to 0.92 % thicker than Lame asks.
    """
    strength = np.asarray(stress_pa, dtype=np.float64) * joint_efficiency
    thin = wall_outside_form_m(pressure_pa, outer_diameter_m, stress_pa, joint_efficiency)
    inner_radius = 0.5 * np.asarray(outer_diameter_m) - thin
    holds = (np.asarray(pressure_pa) < 0.385 * strength) & (thin < 0.5 * inner_radius)
    return np.where(holds, thin, wall_lame_m(pressure_pa, outer_diameter_m, stress_pa, joint_efficiency))


def available_wall_m(
    ordered_wall_m: Values,
    corrosion_allowance_m: Values = 0.0,
    mill_tolerance_fraction: Values = 0.0,
) -> Array:
    """Wall left of the ordered one, thinnest piece and corroded.

    Parameters
    ----------
    ordered_wall_m : array_like
        Nominal wall [m].
    corrosion_allowance_m : array_like
        Corrosion allowance [m].
    mill_tolerance_fraction : array_like
        Under-tolerance: 0.125 pipe, 0.10 average-wall tube, 0 minimum-wall tube.

    Returns
    -------
    Array
        Available wall [m], at least 0.
    """
    thinnest = np.asarray(ordered_wall_m, dtype=np.float64) * (1.0 - np.asarray(mill_tolerance_fraction))
    return np.asarray(np.maximum(thinnest - corrosion_allowance_m, 0.0))


def ordered_wall_m(
    required_wall: Values, corrosion_allowance_m: Values = 0.0, mill_tolerance_fraction: Values = 0.0
) -> Array:
    """Wall to order for a required one: the remedy of too thin a tube.

    Parameters
    ----------
    required_wall : array_like
        Required wall before allowances [m].
    corrosion_allowance_m : array_like
        Corrosion allowance [m].
    mill_tolerance_fraction : array_like
        Under-tolerance, 0 to below 1.

    Returns
    -------
    Array
        Nominal wall [m].
    """
    left = np.maximum(1.0 - np.asarray(mill_tolerance_fraction, dtype=np.float64), 1e-6)
    return np.asarray((np.asarray(required_wall, dtype=np.float64) + corrosion_allowance_m) / left)


def allowable_pressure_pa(
    available_wall: Values,
    outer_diameter_m: Values,
    stress_pa: Values,
    joint_efficiency: Values = 1.0,
) -> Array:
    """Pressure the available wall carries: the inverse of `required_wall_m`.

    Parameters
    ----------
    available_wall : array_like
        Wall after allowances [m].
    outer_diameter_m : array_like
        Outer diameter [m].
    stress_pa : array_like
        Allowable stress at the design temperature [Pa].
    joint_efficiency : array_like
        Joint efficiency, 0 to 1.

    Returns
    -------
    Array
        Internal pressure, gauge [Pa].

    Notes
    -----
    P = S E t/(Ro - 0.4 t) for t < Ri/2 (outside form); Lame beyond.
    """
    strength = np.asarray(stress_pa, dtype=np.float64) * joint_efficiency
    outer = 0.5 * np.asarray(outer_diameter_m, dtype=np.float64)
    wall = np.clip(np.asarray(available_wall, dtype=np.float64), 0.0, outer)
    inner = outer - wall
    thin = strength * wall / (outer - 0.4 * wall)
    thick = strength * (outer**2 - inner**2) / (outer**2 + inner**2)
    return np.where((wall < 0.5 * inner) & (thin < 0.385 * strength), thin, thick)


def hoop_stress_at_bore_pa(pressure_pa: Values, outer_diameter_m: Values, wall_m: Values) -> Array:
    """Exact elastic hoop stress at the bore.

    Parameters
    ----------
    pressure_pa : array_like
        Internal pressure, gauge [Pa].
    outer_diameter_m, wall_m : array_like
        Outer diameter and wall [m].

    Returns
    -------
    Array
        Hoop stress [Pa].

    Notes
    -----
    Lame: P (Ro^2 + Ri^2)/(Ro^2 - Ri^2).
    """
    outer = 0.5 * np.asarray(outer_diameter_m, dtype=np.float64)
    inner = outer - np.minimum(np.maximum(wall_m, 1e-9), outer)
    return np.asarray(pressure_pa * (outer**2 + inner**2) / (outer**2 - inner**2))


def wall_after_bending_m(wall_m: Values, outer_diameter_m: Values, bend_radius_m: Values) -> Array:
    """Wall at the outside of a bend.

    Parameters
    ----------
    wall_m, outer_diameter_m : array_like
        Wall of the straight tube and its outer diameter [m].
    bend_radius_m : array_like
        Bend radius to the tube's centre line [m].

    Returns
    -------
    Array
        Thinned wall [m].

    Notes
    -----
    Thinning t D/(4 Rb), half of what stretching the outer fibre alone would give (shop rule, from memory).
    """
    thinning = np.asarray(outer_diameter_m) / (4.0 * np.maximum(bend_radius_m, 1e-9))
    return np.asarray(np.asarray(wall_m, dtype=np.float64) * np.maximum(1.0 - thinning, 0.0))


PRESSURE_CAUTION = (
    "A screening value, not a code calculation: design, fabrication, testing and relief follow the local "
    "pressure equipment rules under a licensed engineer."
)

INTERNAL = Criterion(
    slug="asme-viii-1-wall",
    check="tube-internal-pressure",
    quantity="available over required wall",
    unit="",
    sense="at-least",
    beyond=1.0,
    near=1.1,
    source="ASME BPVC VIII-1 Appendix 1-1 wall; the 10 % are this service's rule",
    trust="confirmed",
    needs=(
        "design pressure",
        "allowable stress",
        "joint efficiency",
        "corrosion allowance",
        "mill tolerance",
    ),
    caution=PRESSURE_CAUTION,
)
CRITERIA = (INTERNAL,)
