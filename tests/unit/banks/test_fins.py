"""Areas, free widths, metal and refusals of finned tubes."""

from dataclasses import fields
from typing import Any

import numpy as np
import pytest
from fluids.geometry import AirCooledExchanger
from hypothesis import assume, given, settings
from hypothesis import strategies as st

from crossbank_service.banks import TubeBank
from crossbank_service.banks.fins import Layout, Surface, annular, plain, plate, serrated
from crossbank_service.banks.fins_refusals import (
    Refusal,
    fin_refusals,
    layout_refusals,
    serration_refusals,
)


def _array(value: float) -> Any:
    return np.array([value])


def _layout(across: float, along: float, *, staggered: bool = True, rows: float = 4.0) -> Layout:
    return Layout(
        staggered=_array(float(staggered)),
        transverse_pitch=_array(across),
        longitudinal_pitch=_array(along),
        rows=_array(rows),
    )


def _annular(layout: Layout, d: float, h: float, t: float, pitch: float) -> Surface:
    return annular(
        layout=layout,
        outer_diameter=_array(d),
        fin_height=_array(h),
        fin_thickness=_array(t),
        fin_pitch=_array(pitch),
    )


def _serrated(cut_depth: float, width: float = 0.004) -> Surface:
    return serrated(
        layout=_layout(0.1016, 0.088),
        outer_diameter=_array(0.0508),
        fin_height=_array(0.015875),
        fin_thickness=_array(0.00127),
        fin_pitch=_array(1 / 177),
        segment_width=_array(width),
        cut_depth=_array(cut_depth),
    )


def test_annular_fins_worked_by_hand() -> None:
    """A one-inch tube with 354 fins of 12.7 x 0.4 mm a metre, staggered at 63.5 x 55 mm."""
    surface = _annular(_layout(0.0635, 0.055), 0.0254, 0.0127, 0.0004, 1 / 354)
    assert surface.prime_area == pytest.approx(0.0684973, abs=5e-8)
    assert surface.fin_area == pytest.approx(1.098845, abs=5e-7)
    assert surface.area_ratio == pytest.approx(14.6290, abs=5e-5)
    assert surface.transverse_gap == pytest.approx(0.03450336, abs=5e-9)
    assert surface.diagonal_gap == pytest.approx(0.06901951, abs=5e-9)
    assert surface.free_share == pytest.approx(0.543360, abs=5e-7)
    assert surface.fin_gap == pytest.approx(0.00242486, abs=5e-9)


def test_serrated_fins_worked_by_hand() -> None:
    """Fins of 15.875 x 1.27 mm on a two-inch tube, cut to the root, cut to 5 mm above it, and not at all."""
    to_the_root, to_a_ring = _serrated(0.015875), _serrated(0.010875)
    assert to_the_root.fin_area == pytest.approx(1.217504, abs=5e-7)
    assert to_the_root.area == pytest.approx(1.341222, abs=5e-7)
    assert to_a_ring.area == pytest.approx(1.445743, abs=5e-7)
    solid = _annular(_layout(0.1016, 0.088), 0.0508, 0.015875, 0.00127, 1 / 177)
    assert solid.area == pytest.approx(1.359160, abs=5e-7)
    assert _serrated(0.0).fin_area == pytest.approx(float(solid.fin_area[0]), rel=1e-12)


def test_plate_fins_worked_by_hand() -> None:
    """Three rows of 9.97 mm tubes in plates of 0.13 mm every 2.12 mm at 25.4 x 22 mm, per tube and metre."""
    surface = plate(
        layout=_layout(0.0254, 0.022, rows=3.0),
        outer_diameter=_array(0.00997),
        fin_thickness=_array(0.00013),
        fin_pitch=_array(0.00212),
    )
    assert surface.root_diameter == pytest.approx(0.01023)
    assert 3.0 * surface.fin_area == pytest.approx(1.351999, abs=5e-7)
    assert 3.0 * surface.prime_area == pytest.approx(0.0905032, abs=5e-8)
    assert surface.free_width == pytest.approx(0.01423976, abs=5e-9)
    assert surface.hydraulic_diameter == pytest.approx(2.606094e-3, abs=5e-10)


@settings(max_examples=50, deadline=None)
@given(
    d=st.floats(0.01, 0.06),
    h=st.floats(0.001, 0.02),
    t=st.floats(0.0002, 0.001),
    pitch=st.floats(0.0015, 0.008),
    spread=st.floats(1.02, 1.6),
    depth=st.floats(0.55, 1.3),
)
def test_annular_fins_equal_fluids(
    *, d: float, h: float, t: float, pitch: float, spread: float, depth: float
) -> None:
    """Areas and the governing free width are those of the fluids library's air cooler."""
    across = spread * (d + 2.0 * h)
    along = depth * across
    assume(np.hypot(0.5 * across, along) > d + 2.0 * h)
    theirs = AirCooledExchanger(
        tube_rows=4,
        tube_passes=1,
        tubes_per_row=1,
        tube_length=1.0,
        tube_diameter=d,
        fin_thickness=t,
        fin_density=1.0 / pitch,
        fin_height=h,
        pitch_normal=across,
        pitch_parallel=along,
    )
    ours = _annular(_layout(across, along), d, h, t, pitch)
    assert ours.fin_area == pytest.approx(theirs.A_fin_per_tube, rel=1e-12)
    assert ours.prime_area == pytest.approx(theirs.A_tube_showing_per_tube, rel=1e-12)
    assert ours.area_ratio == pytest.approx(theirs.A_increase, rel=1e-12)
    assert ours.free_width == pytest.approx(theirs.A_min, rel=1e-11)


@pytest.mark.parametrize("along", [0.0635, 0.02])
@pytest.mark.parametrize("rows", [1.0, 4.0])
@pytest.mark.parametrize("staggered", [True, False])
def test_fins_of_no_height_are_a_plain_tube(along: float, rows: float, staggered: bool) -> None:
    """Height 0 gives the plain tube's surface, gaps and metal, whatever the fins' pitch and thickness."""
    layout = _layout(0.0635, along, staggered=staggered, rows=rows)
    finned = _annular(layout, 0.0254, 0.0, 0.0004, 0.003)
    bare = plain(layout=layout, outer_diameter=_array(0.0254))
    for name in (
        "area",
        "area_ratio",
        "free_width",
        "free_share",
        "blocked_width",
        "fin_volume",
        "hydraulic_diameter",
    ):
        assert getattr(finned, name) == pytest.approx(float(getattr(bare, name)[0]), rel=1e-12, abs=1e-18), (
            name
        )


def test_diagonal_gap_governs_only_where_there_is_one() -> None:
    """Close rows narrow a staggered bank to its diagonal gaps, but no single row and no in-line bank."""
    fins = (0.0254, 0.0, 0.0004, 0.003)
    diagonal = 2.0 * (np.hypot(0.05, 0.025) - 0.0254)
    assert _annular(_layout(0.1, 0.025), *fins).free_width == pytest.approx(diagonal)
    assert _annular(_layout(0.1, 0.025, rows=1.0), *fins).free_width == pytest.approx(0.1 - 0.0254)
    assert _annular(_layout(0.1, 0.025, staggered=False), *fins).free_width == pytest.approx(0.1 - 0.0254)


def test_fin_metal_is_the_volume_of_its_pieces() -> None:
    """Rings, rings with strips, and plates with collars weigh what their volumes say."""
    solid = _annular(_layout(0.1016, 0.088), 0.0508, 0.015875, 0.00127, 1 / 177)
    ring = 0.25 * np.pi * (0.08255**2 - 0.0508**2) * 0.00127 * 177
    assert solid.fin_mass(_array(7850.0)) == pytest.approx(7850.0 * ring)
    # cut to the root: pi d / w strips of w x 15.875 mm
    assert _serrated(0.015875).fin_volume == pytest.approx(np.pi * 0.0508 * 0.015875 * 0.00127 * 177)
    assert _serrated(0.0).fin_volume == pytest.approx(ring)
    plates = plate(
        layout=_layout(0.0254, 0.022),
        outer_diameter=_array(0.01),
        fin_thickness=_array(0.0002),
        fin_pitch=_array(0.002),
    )
    sheet = (0.0254 * 0.022 - 0.25 * np.pi * 0.0104**2) * 0.0002 / 0.002
    collar = 0.25 * np.pi * (0.0104**2 - 0.01**2)
    assert plates.fin_volume == pytest.approx(sheet + collar)


def test_taking_a_selection_keeps_each_surface() -> None:
    """A selection holds the chosen cases in the chosen order."""
    layout = Layout(
        staggered=np.ones(3),
        transverse_pitch=np.array([0.06, 0.07, 0.08]),
        longitudinal_pitch=np.full(3, 0.05),
        rows=np.full(3, 4.0),
    )
    surface = plain(layout=layout, outer_diameter=np.array([0.02, 0.025, 0.03]))
    chosen = surface.take(np.array([2, 0]))
    assert chosen.bare_area.tolist() == surface.bare_area[[2, 0]].tolist()
    assert chosen.free_width.tolist() == surface.free_width[[2, 0]].tolist()


def test_a_tube_bank_is_a_layout() -> None:
    """The engine's tube bank gives the same surface as the bare layout of its tubes."""
    layout = _layout(0.06, 0.05)
    one = {f.name: _array(1.0) for f in fields(TubeBank)}
    bank = TubeBank(**(one | {f.name: getattr(layout, f.name) for f in fields(layout)}))
    from_bank = plain(layout=bank, outer_diameter=_array(0.025))
    assert from_bank.free_width == plain(layout=layout, outer_diameter=_array(0.025)).free_width


def _reasons(refusals: tuple[Refusal, ...]) -> set[str]:
    return {refusal.reason for refusal in refusals if refusal.where[0]}


@pytest.mark.parametrize(
    ("across", "along", "staggered", "rows", "reasons"),
    [
        (0.0508, 0.0508, True, 4.0, set()),
        (0.0508, 0.0508, False, 4.0, set()),
        (0.0507, 0.0508, False, 4.0, {"overlap-across"}),
        (0.0508, 0.0430, True, 4.0, {"overlap-diagonal"}),
        (0.0508, 0.0430, True, 1.0, set()),
        (0.0508, 0.0507, False, 4.0, {"overlap-along"}),
        (0.0508, 0.0507, False, 1.0, set()),
        (0.1200, 0.0250, True, 2.0, set()),
        (0.1200, 0.0250, True, 3.0, {"overlap-along"}),
    ],
    ids=[
        "touching",
        "touching in-line",
        "row too close",
        "neighbours too close",
        "one row has no neighbours",
        "in-line rows too close",
        "one in-line row",
        "two flat rows",
        "third row behind the first too close",
    ],
)
def test_overlapping_tubes_are_refused(
    *, across: float, along: float, staggered: bool, rows: float, reasons: set[str]
) -> None:
    """Fins of 50.8 mm over all may touch but not overlap their neighbours beside, ahead or behind."""
    layout = _layout(across, along, staggered=staggered, rows=rows)
    assert _reasons(layout_refusals(layout=layout, envelope_diameter=_array(0.0508))) == reasons


def test_a_refused_layout_says_what_would_do() -> None:
    """The limit given with a diagonal overlap is the longitudinal pitch at which neighbours just touch."""
    layout = _layout(0.0508, 0.040)
    refusals = {r.reason: r for r in layout_refusals(layout=layout, envelope_diameter=_array(0.0508))}
    enough = refusals["overlap-diagonal"].at_least
    assert enough is not None
    mended = _layout(0.0508, float(enough[0]))
    assert _reasons(layout_refusals(layout=mended, envelope_diameter=_array(0.0508))) == set()


@pytest.mark.parametrize(
    ("thickness", "pitch", "reasons"),
    [
        (0.0004, 0.0028, set()),
        (0.0004, 0.0004, {"no-fin-gap"}),
        (0.0004, 0.0003, {"no-fin-gap"}),
        (0.0, 0.0028, {"no-fin-thickness"}),
    ],
)
def test_fins_without_gap_or_thickness_are_refused(thickness: float, pitch: float, reasons: set[str]) -> None:
    """A pitch no more than the thickness leaves no gap; a thickness of 0 is no fin."""
    assert _reasons(fin_refusals(fin_thickness=_array(thickness), fin_pitch=_array(pitch))) == reasons


@pytest.mark.parametrize(
    ("width", "cut_depth", "reasons"),
    [
        (0.004, 0.015875, set()),
        (0.004, 0.016, {"cut-beyond-root"}),
        (0.09, 0.015875, {"segment-beyond-circumference"}),
    ],
)
def test_segments_that_cannot_be_cut_are_refused(width: float, cut_depth: float, reasons: set[str]) -> None:
    """Cuts stop at the root and at least two segments stand round the tube."""
    refusals = serration_refusals(
        outer_diameter=_array(0.0508),
        fin_height=_array(0.015875),
        segment_width=_array(width),
        cut_depth=_array(cut_depth),
    )
    assert _reasons(refusals) == reasons


def test_refusals_are_judged_bank_by_bank() -> None:
    """In a batch a bad bank is marked and its neighbours are not."""
    layout = Layout(
        staggered=np.array([1.0, 1.0, 0.0]),
        transverse_pitch=np.array([0.06, 0.04, 0.06]),
        longitudinal_pitch=np.array([0.055, 0.055, 0.055]),
        rows=np.array([4.0, 4.0, 4.0]),
    )
    across = layout_refusals(layout=layout, envelope_diameter=np.full(3, 0.05))[0]
    assert across.where.tolist() == [False, True, False]
