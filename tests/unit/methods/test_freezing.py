"""Freezing: steam coils in cold air, flooded ends, standing liquid, liquids in tubes."""

from typing import Any

import numpy as np
import pytest

from crossbank_service.methods import freezing
from crossbank_service.methods.criterion import BEYOND, NEAR, NO, UNASSESSED, UNKNOWN, WITHIN, YES

GOOD: dict[str, Any] = {
    "throttled": NO,
    "stalls": NO,
    "trap": YES,
    "vacuum_breaker": YES,
    "leg_m": 0.4,
    "drains": YES,
    "distributing": NO,
}


def _grade(air_c: float, **changes: Any) -> int:
    return int(freezing.grade_freezing(air_c + 273.15, **{**GOOD, **changes}))


def test_two_degrees_and_more_are_within_whatever_the_rest() -> None:
    """Nothing freezes in air of +2 C."""
    assert _grade(2.0, throttled=YES, stalls=YES, trap=UNKNOWN) == WITHIN


def test_below_two_degrees_near_is_the_best() -> None:
    """Even with everything right a part can fail."""
    assert _grade(1.9) == NEAR
    assert _grade(-20.0, distributing=YES) == NEAR


@pytest.mark.parametrize(
    "change",
    [
        {"throttled": YES},
        {"stalls": YES},
        {"trap": NO},
        {"vacuum_breaker": NO},
        {"leg_m": 0.2},
        {"drains": NO},
    ],
)
def test_one_thing_known_to_be_wrong_is_beyond(change: dict[str, Any]) -> None:
    """Also where something else is not stated."""
    assert _grade(-1.0, **change) == BEYOND
    assert _grade(-1.0, **{"vacuum_breaker": UNKNOWN, **change}) == BEYOND


@pytest.mark.parametrize(
    "change",
    [{"throttled": UNKNOWN}, {"trap": UNKNOWN}, {"vacuum_breaker": UNKNOWN}, {"leg_m": -1.0}],
)
def test_what_is_not_stated_is_unassessed(change: dict[str, Any]) -> None:
    """No guess is made."""
    assert _grade(-1.0, **change) == UNASSESSED


def test_hard_frost_asks_for_distributing_tubes() -> None:
    """Below -5 C ordinary tubes are beyond, above they do not matter."""
    assert _grade(-5.1) == BEYOND
    assert _grade(-4.9) == NEAR


def test_states_are_graded_side_by_side() -> None:
    """Arrays of states and answers broadcast."""
    air = np.array([[275.15], [272.0]])
    throttled = np.array([NO, YES, UNKNOWN], dtype=np.int8)
    found = freezing.grade_freezing(air, **{**GOOD, "throttled": throttled})
    assert found.tolist() == [[WITHIN] * 3, [NEAR, BEYOND, UNASSESSED]]


def test_still_condensate_takes_the_temperature_of_the_air() -> None:
    """The flooded end tends to the air as the flow stops and to saturation as it grows."""
    found = freezing.flooded_end_temperature_k(263.15, 373.15, 6.0, np.array([0.0, 1e-5, 1e6]), 4200.0)
    assert found[:2].tolist() == [263.15, 263.15]
    assert found[2] == pytest.approx(373.15, abs=1e-6)


def test_standing_liquid_freezes_after_one_time_constant_per_factor_e() -> None:
    """From 20 C in air of -10 C to 0 C: ln 3 time constants of 8400 s."""
    found = freezing.standstill_time_to_freezing_s(293.15, 263.15, 273.15, 42000.0, 5.0)
    assert found == pytest.approx(8400.0 * 1.0986123, rel=1e-7)


def test_liquid_above_freezing_air_stands_for_ever_and_cold_liquid_not_at_all() -> None:
    """The ends of the scale are numbers, not infinities."""
    found = freezing.standstill_time_to_freezing_s(
        np.array([293.15, 270.0]), np.array([280.0, 260.0]), 273.15, 1.0, 1.0
    )
    assert found.tolist() == [1e9, 0.0]


@pytest.mark.parametrize(
    ("margin_k", "air_c", "plain", "proven", "expected"),
    [
        (6.0, 10.0, True, UNKNOWN, WITHIN),
        (4.0, 10.0, True, UNKNOWN, NEAR),
        (1.0, 10.0, False, YES, BEYOND),
        (30.0, -10.0, True, UNKNOWN, BEYOND),
        (30.0, -10.0, True, YES, NEAR),
        (30.0, -10.0, False, NO, WITHIN),
        (np.nan, 10.0, False, YES, UNASSESSED),
        (np.nan, -10.0, True, NO, BEYOND),
    ],
)
def test_liquids_are_graded_by_wall_and_by_exposure(
    margin_k: float, air_c: float, plain: bool, proven: int, expected: int
) -> None:
    """Plain water in frosty air is beyond unless its flow is proven."""
    found = freezing.grade_liquid_freezing(margin_k, air_c + 273.15, plain_water=plain, flow_proven=proven)
    assert found == expected
