"""Areas, sections, volumes and masses of plain banks: by hand, and against a drawing measured point by point."""

from math import hypot, pi
from typing import Any

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from crossbank_service.banks import TubeBank

_NUMBERS = {
    "staggered": 1.0,
    "transverse_pitch": 0.05,
    "longitudinal_pitch": 0.045,
    "rows": 6.0,
    "tubes_per_row": 20.0,
    "tube_length": 2.0,
    "side_gap": 0.0125,
    "outer_diameter": 0.025,
    "wall_thickness": 0.002,
    "roughness": 4.5e-5,
    "tube_density": 7850.0,
}


def _bank(**members: float) -> TubeBank:
    numbers = {**_NUMBERS, **members}
    numbers.setdefault("covered_rows", numbers["rows"])
    columns: Any = {name: np.array([value]) for name, value in numbers.items()}
    return TubeBank(**columns)


def _one(values: np.ndarray) -> float:
    assert values.shape == (1,)
    return float(values[0])


def test_sizes_of_a_bank_by_hand() -> None:
    """A bank of 6 x 20 tubes of 25 x 2 mm, worked out on paper."""
    bank = _bank()
    assert _one(bank.a) == pytest.approx(2.0)
    assert _one(bank.b) == pytest.approx(1.8)
    assert _one(bank.bore) == pytest.approx(0.021)
    assert _one(bank.width) == pytest.approx(1.0)  # 19 x 0.05 + 0.025 + 2 x 0.0125
    assert _one(bank.depth) == pytest.approx(0.25)  # 5 x 0.045 + 0.025
    assert _one(bank.face_area) == pytest.approx(2.0)
    assert _one(bank.free_area) == pytest.approx(1.0)  # 20 gaps of 25 mm, 2 m long
    assert _one(bank.sigma) == pytest.approx(0.5)
    assert _one(bank.tube_count) == 120.0
    assert _one(bank.outside_area) == pytest.approx(18.849556, rel=1e-7)  # 120 pi 0.025 2
    assert _one(bank.inside_area) == pytest.approx(15.833627, rel=1e-7)  # 120 pi 0.021 2
    assert _one(bank.bore_section) == pytest.approx(3.4636059e-4, rel=1e-7)
    assert _one(bank.inside_volume) == pytest.approx(0.083126542, rel=1e-7)
    # 120 x 2 m x pi/4 (0.025^2 - 0.021^2) m2 x 7850 kg/m3
    assert _one(bank.metal_mass) == pytest.approx(272.262, rel=1e-5)


def test_published_free_sections() -> None:
    """Staggered a = 3, b = 1 at 4 m/s: 7.47407 m/s in the diagonal gaps; in-line a = 2: 8 m/s (hand calculation)."""
    flat = _bank(transverse_pitch=0.075, longitudinal_pitch=0.025, side_gap=0.025)
    assert 4.0 / _one(flat.sigma) == pytest.approx(7.47407, abs=5e-6)
    assert _one(flat.diagonal_gap_governs) == 1.0
    inline = _bank(staggered=0.0)
    assert 4.0 / _one(inline.sigma) == pytest.approx(8.0)


def test_diagonal_is_of_no_account_in_line_and_in_one_row() -> None:
    """Only staggered banks of two rows or more have diagonal gaps."""
    pitches = {"transverse_pitch": 0.075, "longitudinal_pitch": 0.0251}
    assert _one(_bank(**pitches, staggered=0.0).diagonal_gap_governs) == 0.0
    assert _one(_bank(**pitches, rows=1.0).diagonal_gap_governs) == 0.0
    assert _one(_bank(**pitches, rows=2.0).diagonal_gap_governs) == 1.0


def test_switch_to_the_diagonal_is_continuous() -> None:
    """Where b = sqrt(2a + 1)/2 both gaps are the same and the free section does not jump."""
    a = 2.4
    b = 0.5 * np.sqrt(2.0 * a + 1.0)
    common = {"transverse_pitch": 0.025 * a, "side_gap": 0.5 * 0.025 * (a - 1.0)}
    below, above = (_bank(**common, longitudinal_pitch=0.025 * b * (1.0 + e)) for e in (-1e-9, 1e-9))
    assert _one(below.diagonal_gap_governs) == 1.0
    assert _one(above.diagonal_gap_governs) == 0.0
    assert _one(below.free_area) == pytest.approx(_one(above.free_area), rel=1e-8)


@pytest.mark.parametrize("gap", [0.0, 0.005, 0.0125, 0.1])
def test_side_gap_widens_duct_and_section_alike(gap: float) -> None:
    """What the side gap adds to the duct it adds to the transverse section: gaps of row 1 from wall to wall."""
    bank = _bank(side_gap=gap)
    between = 19 * 0.025 + 2.0 * gap
    assert _one(bank.free_area) == pytest.approx(between * 2.0, rel=1e-12)
    assert _one(bank.width) == pytest.approx(between + 20 * 0.025, rel=1e-12)


def test_one_tube_alone() -> None:
    """One tube in a duct leaves the two side gaps."""
    bank = _bank(rows=1.0, tubes_per_row=1.0, side_gap=0.02)
    assert _one(bank.depth) == pytest.approx(0.025)
    assert _one(bank.width) == pytest.approx(0.065)
    assert _one(bank.free_area) == pytest.approx(0.04 * 2.0)
    assert _one(bank.outside_area) == pytest.approx(pi * 0.025 * 2.0)


def test_unknown_density_has_no_mass() -> None:
    """A metal whose density is not known weighs 0, which the result turns into null."""
    assert _one(_bank(tube_density=0.0).metal_mass) == 0.0


def _narrowest_drawn(d: float, st_: float, sl: float, staggered: bool) -> float:
    """Narrowest section of one pitch cell drawn out: the least distance between the metal across the stream.

    The stream comes through the gap of one row and, staggered, parts into the two diagonal gaps.
    """
    angle = np.linspace(0.0, 2.0 * pi, 721)
    circle = 0.5 * d * np.stack([np.cos(angle), np.sin(angle)], axis=1)

    def gap(x: float, y: float) -> float:
        shifted = circle + np.array([x, y])
        step = shifted[:, None, :] - circle[None, :, :]
        return float(np.sqrt((step**2).sum(axis=2)).min())

    across = gap(0.0, st_)
    return min(across, 2.0 * gap(sl, 0.5 * st_)) if staggered else across


@settings(derandomize=True, max_examples=8, deadline=None)
@given(st.floats(1.1, 4.0), st.floats(0.6, 3.0), st.booleans())
def test_free_section_of_a_drawing(a: float, b: float, staggered: bool) -> None:
    """The free section of a pitch is the least distance between circles measured on their outlines."""
    d = 0.02
    if hypot(0.5 * a, b) < 1.05:
        b = 1.1
    bank = _bank(
        staggered=float(staggered),
        outer_diameter=d,
        wall_thickness=0.001,
        transverse_pitch=a * d,
        longitudinal_pitch=b * d,
        side_gap=0.5 * d * (a - 1.0),
    )
    drawn = _narrowest_drawn(d, a * d, b * d, staggered)
    assert _one(bank.free_area) / (20.0 * 2.0) == pytest.approx(drawn, rel=1e-3, abs=1e-5 * d)


def test_many_banks_stand_side_by_side() -> None:
    """Banks in one array keep their own numbers, and a selection keeps them too."""
    pitches = np.array([0.05, 0.06, 0.075])
    columns: Any = {name: np.full(3, value) for name, value in _NUMBERS.items()}
    columns["covered_rows"] = columns["rows"]
    columns["transverse_pitch"] = pitches
    columns["side_gap"] = 0.5 * (pitches - 0.025)
    together = TubeBank(**columns)
    np.testing.assert_allclose(together.width, 20.0 * pitches, rtol=1e-12)
    picked = together.take(np.array([2, 0]))
    np.testing.assert_array_equal(picked.free_area, together.free_area[[2, 0]])
    alone = _bank(transverse_pitch=0.06, side_gap=0.0175)
    assert together.free_area[1] == alone.free_area[0]
    assert together.outside_area[1] == alone.outside_area[0]
