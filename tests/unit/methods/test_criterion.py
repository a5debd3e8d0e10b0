"""Grading: limits, straddling, missing data, and how grades combine."""

import numpy as np
import pytest

from crossbank_service.methods import (
    condensate,
    dew_points,
    external_pressure,
    freezing,
    metal_limits,
    pressure_walls,
    scatter,
    thermal_expansion,
)
from crossbank_service.methods.criterion import (
    BEYOND,
    NEAR,
    TRUST_WORDS,
    UNASSESSED,
    WITHIN,
    Criterion,
    grade,
    margin,
    worst,
)

ALL = (
    *condensate.CRITERIA,
    *dew_points.CRITERIA,
    *external_pressure.CRITERIA,
    *freezing.CRITERIA,
    *metal_limits.CRITERIA,
    *pressure_walls.CRITERIA,
    *scatter.CRITERIA,
    *thermal_expansion.CRITERIA,
)


def test_values_on_the_limits_count_as_the_milder_grade() -> None:
    """A value equal to the near limit is within, one equal to the limit is near."""
    at_most = grade(np.array([0.5, 0.6, 0.8, 0.81]), 0.8, 0.5, sense="at-most")
    at_least = grade(np.array([10.0, 9.9, 0.0, -0.1]), 0.0, 10.0, sense="at-least")
    assert at_most.tolist() == at_least.tolist() == [WITHIN, NEAR, NEAR, BEYOND]


def test_missing_data_never_read_as_within() -> None:
    """What is not a finite number is unassessed, in the value as in the limit."""
    assert grade(np.array([np.nan, np.inf]), 1.0, 0.5, sense="at-most").tolist() == [UNASSESSED] * 2
    assert grade(0.1, np.array([np.nan]), 0.5, sense="at-most").tolist() == [UNASSESSED]


def test_an_interval_across_the_limit_is_at_best_near() -> None:
    """A within whose interval reaches past the limit becomes near; a beyond stays."""
    codes = grade(
        np.array([12.0, 12.0, -1.0]),
        0.0,
        10.0,
        sense="at-least",
        expanded_uncertainty=np.array([5.0, 13.0, 5.0]),
    )
    assert codes.tolist() == [WITHIN, NEAR, BEYOND]


def test_the_margin_is_positive_on_the_safe_side() -> None:
    """The sense decides the sign of the margin."""
    assert margin(3.0, 5.0, "at-most") == 2.0
    assert margin(3.0, 5.0, "at-least") == -2.0


def test_beyond_outranks_unassessed_and_unassessed_outranks_near() -> None:
    """The worst of several grades follows the order of the overall word."""
    codes = np.array([WITHIN, NEAR, UNASSESSED, BEYOND], dtype=np.int8)
    assert worst(codes, np.full(4, NEAR, dtype=np.int8)).tolist() == [NEAR, NEAR, UNASSESSED, BEYOND]
    assert worst(codes, np.full(4, UNASSESSED, dtype=np.int8)).tolist() == [UNASSESSED] * 3 + [BEYOND]


@pytest.mark.parametrize("criterion", ALL, ids=lambda c: c.slug)
def test_every_criterion_says_what_it_rests_on(criterion: Criterion) -> None:
    """A criterion has limits on the right sides, a source, and says so when it is from memory or a rule."""
    ordered = (
        criterion.near <= criterion.beyond
        if criterion.sense == "at-most"
        else criterion.near >= criterion.beyond
    )
    assert ordered
    assert criterion.source
    assert TRUST_WORDS[criterion.trust] in criterion.attribution


def test_slugs_of_criteria_are_unique() -> None:
    """No two criteria share a slug."""
    assert len({c.slug for c in ALL}) == len(ALL)
