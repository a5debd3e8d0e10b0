"""What ``auto`` stands for on finned banks."""

import pytest

from crossbank_service.methods import finned_annular, finned_plate, finned_serrated
from crossbank_service.methods.finned_auto import (
    auto_annular_heat_transfer,
    auto_annular_pressure_drop,
    auto_plate,
    auto_serrated,
)

_KNOWN = {
    (record.role, record.slug): record
    for module in (finned_annular, finned_plate, finned_serrated)
    for record in module.RECORDS
}


@pytest.mark.parametrize(
    ("staggered", "height", "welded", "heat", "drop"),
    [
        (True, 0.0127, False, "briggs-young-low-reynolds-blend", "esdu-86022"),
        (True, 0.0015, False, "esdu-84016", "esdu-84016"),
        (True, 0.0127, True, "weierman-1976", "weierman-1976"),
        (False, 0.0127, False, "ganguli-1985", "weierman-1976"),
        (False, 0.0015, False, "ganguli-1985", "weierman-1976"),
        (False, 0.0127, True, "weierman-1976", "weierman-1976"),
    ],
)
def test_annular_fins_are_told_apart_by_geometry(
    staggered: bool, height: float, welded: bool, heat: str, drop: str
) -> None:
    """Arrangement, fin height and welding choose the methods, and both suit the arrangement."""
    assert auto_annular_heat_transfer(staggered=staggered, fin_height_m=height, welded=welded) == heat
    assert auto_annular_pressure_drop(staggered=staggered, fin_height_m=height, welded=welded) == drop
    word = "staggered" if staggered else "inline"
    assert word in _KNOWN["outside_heat_transfer", heat].arrangements
    assert word in _KNOWN["outside_pressure_drop", drop].arrangements


@pytest.mark.parametrize(
    ("staggered", "diameter", "across", "along", "slug"),
    [
        (True, 0.01023, 0.0254, 0.022, "wang-chi-chang-2000"),
        (True, 0.0165, 0.038, 0.033, "gray-webb-1986"),
        (True, 0.01023, 0.034, 0.022, "gray-webb-1986"),
        (False, 0.01023, 0.0254, 0.022, "gray-webb-1986"),
    ],
    ids=["small tubes", "larger tubes", "wide pitch", "in-line"],
)
def test_plates_are_told_apart_by_geometry(
    staggered: bool, diameter: float, across: float, along: float, slug: str
) -> None:
    """Wang, Chi & Chang for small staggered tubes at ordinary pitches, Gray & Webb for the rest."""
    chosen = auto_plate(
        staggered=staggered, diameter_m=diameter, transverse_pitch_m=across, longitudinal_pitch_m=along
    )
    assert chosen == slug
    assert ("staggered" if staggered else "inline") in _KNOWN["outside_heat_transfer", slug].arrangements


def test_serrated_fins_have_one_method() -> None:
    """Serrated fins go by Weierman, whose records name them."""
    for role in ("outside_heat_transfer", "outside_pressure_drop"):
        assert "serrated" in _KNOWN[role, auto_serrated()].surfaces
