"""Geometry the plain-bank correlations share."""

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from crossbank_service.methods._layout import (
    diagonal_governs,
    free_area_ratio,
    void_fraction,
    volumetric_diameter_ratio,
)

A = np.array([3.0])
B = np.array([1.0])
STAGGERED = np.array([1.0])
INLINE = np.array([0.0])


def test_diagonal_gap_sets_the_highest_velocity_of_a_flat_staggered_bank() -> None:
    """By hand: 4 m/s before pitches 3 x 1 gives 7.47407 m/s in the diagonal gaps."""
    assert 4.0 / free_area_ratio(A, B, STAGGERED)[0] == pytest.approx(7.47407, abs=5e-6)


def test_transverse_gap_sets_it_in_line_and_in_one_row_alone() -> None:
    """By hand: 4 m/s before an in-line bank of pitch 2 gives 8 m/s; one row has no diagonal."""
    assert 4.0 / free_area_ratio(np.array([2.0]), B, INLINE)[0] == 8.0
    assert free_area_ratio(A, B, STAGGERED, np.array([1.0]))[0] == 2.0 / 3.0


@given(a=st.floats(1.05, 6.0), b=st.floats(0.5, 6.0))
def test_diagonal_rule_is_the_closed_condition_of_the_pitches(a: float, b: float) -> None:
    """By algebra: 2(c - 1) < a - 1 is b < sqrt(2a + 1)/2, where tubes do not overlap."""
    edge = 0.5 * np.sqrt(2.0 * a + 1.0)
    if abs(b - edge) > 1e-6:
        governs = bool(diagonal_governs(np.array([a]), np.array([b]), STAGGERED)[0])
        assert governs == (b < edge)


def test_void_fraction_changes_form_at_a_longitudinal_pitch_of_one() -> None:
    """By hand: 1 - pi/8 for a = b = 2 and the same for 2.5 x 0.8, whose product is 2."""
    expected = 1.0 - np.pi / 8.0
    assert void_fraction(np.array([2.0]), np.array([2.0]))[0] == pytest.approx(expected, rel=1e-15)
    assert void_fraction(np.array([2.5]), np.array([0.8]))[0] == pytest.approx(expected, rel=1e-15)


def test_volumetric_diameter_of_a_square_bank() -> None:
    """By hand: 16/pi - 1 for a = b = 2."""
    ratio = volumetric_diameter_ratio(np.array([2.0]), np.array([2.0]))[0]
    assert ratio == pytest.approx(16.0 / np.pi - 1.0, rel=1e-15)
