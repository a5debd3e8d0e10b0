"""Section, mass, layout and damping of tubes."""

import numpy as np
import pytest

from crossbank_service.methods import tube_section as ts

ROOT2, ROOT3 = np.sqrt(2.0), np.sqrt(3.0)


def test_solid_bar_has_the_closed_form_second_moment() -> None:
    """A wall of half the diameter gives pi D^4/64 and a radius of gyration of D/4."""
    bar = ts.section(np.array([0.02]), np.array([0.02]))
    assert bar.second_moment_m4[0] == pytest.approx(np.pi * 0.02**4 / 64.0, rel=1e-14)
    assert bar.radius_of_gyration_m[0] == pytest.approx(0.005, rel=1e-14)
    assert bar.inner_diameter_m[0] == 0.0


def test_mass_adds_contents_fins_and_added_mass() -> None:
    """Water in and around a tube, and fins, add what their volumes weigh (hand calculation)."""
    mass = ts.tube_mass(
        outer_diameter_m=np.array([0.0254]),
        wall_thickness_m=np.array([0.00211]),
        tube_density_kg_m3=np.array([7850.0]),
        inside_density_kg_m3=np.array([1000.0]),
        outside_density_kg_m3=np.array([1000.0]),
        added_mass_coefficient=np.array([1.5]),
        fin_mass_kg_m=np.array([0.7135]),
    )
    # metal 1.211913, bore 0.352323, fins 0.7135, outside 1.5 x 0.506707
    assert mass[0] == pytest.approx(3.037797, abs=2e-6)


@pytest.mark.parametrize(
    ("a", "b", "staggered", "pattern"),
    [
        (1.5, 0.75 * ROOT3, 1.0, 30),
        (1.5 * ROOT2, 0.75 * ROOT2, 1.0, 45),
        (1.5 * ROOT3, 0.75, 1.0, 60),
        (2.0, 1.25, 0.0, 90),
    ],
)
def test_standard_layouts_are_recognised(a: float, b: float, staggered: float, pattern: int) -> None:
    """The four layouts of the field come out by name, with their tube pitch as the smallest distance."""
    pitches = np.array([a]), np.array([b]), np.array([staggered])
    assert ts.layout_pattern(*pitches)[0] == pattern
    assert ts.smallest_pitch_ratio(*pitches)[0] == pytest.approx(1.25 if pattern == 90 else 1.5, rel=1e-14)


def test_added_mass_tends_to_that_of_a_lone_cylinder() -> None:
    """At wide pitches the neighbours lose their influence."""
    coefficient = ts.added_mass_coefficient(np.array([30.0]), np.array([90]))
    assert coefficient[0] == pytest.approx(1.0, abs=1e-4)


def test_added_mass_stays_close_to_potential_flow() -> None:
    """Multipole solutions among rigid neighbours lie within -2 and +9 % of the formula."""
    potential = np.array([1.718, 1.256, 1.197, 1.052])
    formula = ts.added_mass_coefficient(np.array([1.25, 1.5, 1.5, 2.0]), np.array([30, 30, 90, 90]))
    assert np.all((formula / potential > 0.975) & (formula / potential < 1.085))


def test_characteristic_span_takes_the_three_longest() -> None:
    """Absent spans do not count, whether a column stands for them or not."""
    spans = np.array([[1.0, 0.4, 1.2, 0.8], [0.9, 0.0, 0.0, 0.0], [0.5, 0.7, 0.0, 0.0]])
    np.testing.assert_allclose(ts.characteristic_span(spans), [1.0, 0.9, 0.6], rtol=1e-15)
    assert ts.characteristic_span(spans[2:, :2])[0] == ts.characteristic_span(spans)[2]


def test_gas_damping_is_floored_capped_and_lower_in_higher_bands() -> None:
    """One span has no friction at supports; modes above the first band keep 0.7; credit ends at 0.02."""
    zeta = ts.damping_gas(
        span_count=np.array([1.0, 4.0, 4.0, 6.0]),
        support_thickness_m=np.array([0.01, 0.01, 0.01, 0.9]),
        characteristic_span_m=np.ones(4),
        mode=np.array([1.0, 4.0, 5.0, 1.0]),
    )
    np.testing.assert_allclose(zeta, [0.001, 0.00375, 0.7 * 0.00375, 0.02], rtol=1e-12)


def test_cautious_reading_of_the_gas_coefficient_lowers_the_critical_velocity_by_1_77() -> None:
    """0.05 and 0.05/pi differ by the square root of pi in the velocity."""
    ratio = ts.GAS_DAMPING_COEFFICIENT / ts.GAS_DAMPING_COEFFICIENT_CAUTIOUS
    assert np.sqrt(ratio) == pytest.approx(1.77, abs=0.005)


def test_law_is_offered_only_for_its_layouts() -> None:
    """A law with layouts of its own refuses the others, one without takes all."""
    pattern = np.array([30, 45, 60, 90])
    law = ts.Law(
        slug="x-1900", check="c", gives="g", function=np.sqrt, source="s", trust="memory", patterns=(45, 90)
    )
    assert law.offered(pattern).tolist() == [False, True, False, True]
    assert "from memory" in law.attribution
