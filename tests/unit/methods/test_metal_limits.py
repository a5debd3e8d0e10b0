"""Metal: faces between streams, the remedies that move them, limits by slug, ignition, velocities."""

import numpy as np
import pytest

from crossbank_service.methods import metal_limits, velocity_limits
from crossbank_service.methods.criterion import BEYOND, NEAR, UNASSESSED, WITHIN


def test_each_remedy_puts_the_face_where_it_was_wanted() -> None:
    """Warmer feed, hotter gas or another share of resistance: put back, the gas-side face is at 380 K."""
    hot, cold = np.array([420.0, 450.0]), np.array([320.0, 340.0])
    resistances = (0.012, 5e-5, 0.003)
    share = (5e-5 + 0.003) / sum(resistances)
    warmer = metal_limits.cold_stream_for_face_k(380.0, hot, share)
    hotter = metal_limits.hot_stream_for_face_k(380.0, cold, share)
    np.testing.assert_allclose(
        metal_limits.face_temperatures_k(hot, warmer, *resistances)[0], 380.0, rtol=1e-13
    )
    np.testing.assert_allclose(
        metal_limits.face_temperatures_k(hotter, cold, *resistances)[0], 380.0, rtol=1e-13
    )
    wanted = metal_limits.cold_share_for_face(380.0, hot, cold)
    np.testing.assert_allclose(cold + wanted * (hot - cold), 380.0, rtol=1e-13)


def test_a_deposit_on_the_hot_side_cools_the_metal() -> None:
    """So the coldest metal has to be looked for clean and fouled."""
    clean = metal_limits.face_temperatures_k(430.0, 300.0, 0.012, 5e-5, 0.018)
    fouled = metal_limits.face_temperatures_k(430.0, 300.0, 0.015, 5e-5, 0.018)
    assert fouled[0] < clean[0]
    assert fouled[1] < clean[1]


def test_faces_without_resistance_or_difference_stay_finite() -> None:
    """No resistance puts both faces midway, no difference at the streams."""
    np.testing.assert_array_equal(metal_limits.face_temperatures_k(400.0, 300.0, 0.0, 0.0, 0.0), 350.0)
    assert metal_limits.cold_share_for_face(380.0, 350.0, 350.0) == 0.0
    assert metal_limits.cold_share_for_face(500.0, 400.0, 300.0) == 1.0


def test_limits_are_found_by_slug_and_unknown_metals_are_not_guessed() -> None:
    """Carbon steel 425 C, wound fins 130 C; an unlisted alloy has no limit."""
    steel = metal_limits.metal_limit("carbon-steel")
    wound = metal_limits.metal_limit("tension-wound")
    assert steel is not None
    assert wound is not None
    assert steel.highest_k == 698.15
    assert steel.lowest_k == pytest.approx(244.15)
    assert wound.highest_k == 403.15
    assert metal_limits.metal_limit("unheard-of-alloy") is None


def test_cold_carbon_steel_is_a_question_and_never_beyond() -> None:
    """Below -29 C the finding is near: the code on impact tests decides."""
    assert metal_limits.COLD_METAL.grade(np.array([5.0, -1.0, -200.0])).tolist() == [WITHIN, NEAR, NEAR]


def test_metal_is_graded_25_kelvin_before_its_limit() -> None:
    """Within to 25 K below the limit, near to it, beyond above."""
    assert metal_limits.TUBE_METAL.grade(np.array([25.0, 24.9, 0.0, -0.1])).tolist() == [
        WITHIN,
        NEAR,
        NEAR,
        BEYOND,
    ]


def test_a_surface_under_dust_keeps_75_kelvin_from_ignition() -> None:
    """A wood dust layer igniting at 300 C allows 225 C (75 K as for electrical apparatus in dust)."""
    assert metal_limits.highest_surface_k(573.15) == pytest.approx(498.15)
    assert metal_limits.IGNITION.grade(np.array([101.0, 80.0, 74.0])).tolist() == [WITHIN, NEAR, BEYOND]


def test_velocities_are_graded_against_both_ends() -> None:
    """Within to 0.8 of the limit, near to it or below the least, beyond above; unknown is unassessed."""
    ash = velocity_limits.velocity_limit("coal-average-ash", inside=False)
    assert ash is not None
    codes = ash.grade(np.array([9.6, 11.0, 12.1, 4.0, np.nan]))
    assert codes.tolist() == [WITHIN, NEAR, BEYOND, NEAR, UNASSESSED]
    assert velocity_limits.velocity_limit("coal-average-ash", inside=True) is None
    steam = velocity_limits.velocity_limit("steam-tube-inlet", inside=True)
    assert steam is not None
    assert steam.grade(np.array([0.1, 46.0])).tolist() == [WITHIN, BEYOND]


def test_the_free_area_factor_brings_the_velocity_within() -> None:
    """15 m/s against 12 m/s needs 1.5625 of the area to reach 0.8 of the limit; 5 m/s nothing."""
    assert velocity_limits.free_area_factor(15.0, 12.0) == pytest.approx(15.0 / 9.6)
    assert velocity_limits.free_area_factor(5.0, 12.0) == 1.0
