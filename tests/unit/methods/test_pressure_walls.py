"""Walls: agreement of the forms, inverses, thick walls, collapse under external pressure."""

import numpy as np
import pytest

from crossbank_service.methods import external_pressure, pressure_walls

STRESS = 100e6


def test_inside_and_outside_form_are_the_same_equation() -> None:
    """Formula t = P Ri/(S E - 0.6 P) on the bore that the outside form leaves gives the same wall."""
    pressure = np.linspace(0.1e6, 30e6, 20)
    wall = pressure_walls.wall_outside_form_m(pressure, 0.05, STRESS, 0.85)
    again = pressure_walls.wall_inside_form_m(pressure, 0.05 - 2.0 * wall, STRESS, 0.85)
    np.testing.assert_allclose(again, wall, rtol=1e-12)


def test_the_outside_form_lies_little_above_lame() -> None:
    """0.27 % at P/S 0.03, 0.92 % at most, and never below it up to 0.384 (exact elastic solution)."""
    ratio = np.linspace(0.005, 0.384, 200)
    excess = (
        pressure_walls.wall_outside_form_m(ratio * STRESS, 0.05, STRESS)
        / pressure_walls.wall_lame_m(ratio * STRESS, 0.05, STRESS)
        - 1.0
    )
    assert excess.max() == pytest.approx(0.0092, abs=5e-5)
    assert excess.min() > 0.0
    at_three = pressure_walls.wall_outside_form_m(3e6, 0.05, STRESS) / pressure_walls.wall_lame_m(
        3e6, 0.05, STRESS
    )
    assert at_three - 1.0 == pytest.approx(0.00274, abs=5e-6)


def test_lame_wall_brings_the_bore_to_the_allowable_stress() -> None:
    """The hoop stress at the bore of the wall found is the stress allowed."""
    pressure = np.array([1e6, 20e6, 60e6, 95e6])
    wall = pressure_walls.wall_lame_m(pressure, 0.05, STRESS)
    np.testing.assert_allclose(pressure_walls.hoop_stress_at_bore_pa(pressure, 0.05, wall), STRESS, rtol=1e-9)


def test_required_wall_joins_thin_and_thick_without_a_step() -> None:
    """At P = 0.385 S the two forms differ by less than 0.01 %, and the wall rises throughout."""
    thin = pressure_walls.wall_outside_form_m(0.385 * STRESS, 0.05, STRESS)
    assert thin / pressure_walls.wall_lame_m(0.385 * STRESS, 0.05, STRESS) == pytest.approx(1.0, abs=1e-4)
    many = pressure_walls.required_wall_m(np.linspace(0.0, 0.99, 100) * STRESS, 0.05, STRESS)
    assert many[0] == 0.0
    assert np.all(np.diff(many) > 0.0)


def test_no_wall_holds_a_pressure_above_the_stress() -> None:
    """Then the whole radius is asked for, so that no tube passes."""
    assert pressure_walls.required_wall_m(120e6, 0.05, STRESS) == 0.025


def test_allowable_pressure_inverts_the_required_wall() -> None:
    """Thin and thick, with a weld."""
    pressure = np.array([0.5e6, 5e6, 20e6, 50e6])
    wall = pressure_walls.required_wall_m(pressure, 0.05, STRESS, 0.85)
    np.testing.assert_allclose(
        pressure_walls.allowable_pressure_pa(wall, 0.05, STRESS, 0.85), pressure, rtol=1e-9
    )


def test_the_ordered_wall_leaves_the_required_one() -> None:
    """Ordering undoes tolerance and corrosion; a wall all eaten away leaves nothing."""
    ordered = pressure_walls.ordered_wall_m(0.9e-3, 1e-3, 0.1)
    assert pressure_walls.available_wall_m(ordered, 1e-3, 0.1) == pytest.approx(0.9e-3, rel=1e-12)
    assert pressure_walls.available_wall_m(0.5e-3, 1e-3, 0.1) == 0.0


def test_the_pull_on_the_ends_asks_for_half_the_wall() -> None:
    """A closed thin shell has half the hoop stress along its axis."""
    hoop = pressure_walls.wall_inside_form_m(1e5, 0.05, STRESS)
    assert pressure_walls.wall_longitudinal_m(1e5, 0.05, STRESS) / hoop == pytest.approx(0.5, rel=1e-3)


def test_a_tight_bend_thins_the_wall() -> None:
    """A radius of 1.5 diameters takes a sixth (shop rule, from memory)."""
    assert pressure_walls.wall_after_bending_m(3e-3, 0.05, 0.075) == pytest.approx(2.5e-3)


def test_elastic_collapse_is_the_buckling_of_a_ring() -> None:
    """3 E I/((1 - nu^2) R^3) with I = t^3/12, R the mean radius (Timoshenko & Gere, ring under pressure)."""
    wall, outer = 1.5e-3, 0.04
    ring = 3.0 * 200e9 * wall**3 / 12.0 / (0.91 * ((outer - wall) / 2.0) ** 3)
    assert external_pressure.elastic_collapse_pa(outer, wall, 200e9) == pytest.approx(ring, rel=1e-12)


def test_collapse_stays_below_both_of_its_parts() -> None:
    """A slender tube buckles, a stocky one yields; without a wall nothing is left."""
    wall = np.array([0.0, 0.1e-3, 1e-3, 5e-3])
    found = external_pressure.collapse_pressure_pa(0.05, wall, 200e9, 200e6)
    elastic, plastic = external_pressure.elastic_collapse_pa(0.05, wall, 200e9), 2.0 * 200e6 * wall / 0.05
    assert found[0] == 0.0
    assert np.all(found[1:] < np.minimum(elastic, plastic)[1:])
    assert found[1] == pytest.approx(elastic[1], rel=0.02)
    assert found[3] == pytest.approx(plastic[3], rel=0.1)


def test_the_wall_for_external_pressure_has_the_wanted_safety() -> None:
    """Put back, its collapse pressure is four times the pressure."""
    pressure = np.array([0.1e6, 1e6, 3e6])
    wall = external_pressure.wall_for_external_pressure_m(pressure, 0.05, 190e9, 180e6)
    collapse = external_pressure.collapse_pressure_pa(0.05, wall, 190e9, 180e6)
    np.testing.assert_allclose(collapse / pressure, 4.0, rtol=1e-9)
