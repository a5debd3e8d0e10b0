"""Fin efficiencies: against hand values, plane conduction, other solutions of the same equation, limits."""

from typing import Any

import numpy as np
import psychrolib
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from scipy.integrate import solve_bvp
from scipy.sparse import coo_matrix
from scipy.sparse.linalg import spsolve

from crossbank_service.methods.fin_efficiency import (
    annular_efficiency,
    annular_efficiency_schmidt,
    annular_tip_ratio,
    plate_corner_ratio,
    plate_efficiency,
    surface_efficiency,
    wet_coefficient,
)
from crossbank_service.methods.fin_efficiency_serrated import (
    segment_efficiency,
    serrated_efficiency,
    serrated_tip_ratio,
    weierman_serrated_efficiency,
    weierman_solid_efficiency,
)
from crossbank_service.methods.fin_surfaces import serrated_fin_area
from crossbank_service.methods.finned_auto import fin_efficiency_of

Array = Any

WELDED = {"diameter_m": 0.0508, "fin_height_m": 0.015875, "fin_thickness_m": 0.00127}
STEEL = {"heat_transfer_coefficient_w_m2_k": 60.0, "fin_conductivity_w_m_k": 40.0}


def _fin(root: float, tip: float, thickness: float, conductivity: float, film: float) -> dict[str, float]:
    return {
        "heat_transfer_coefficient_w_m2_k": film,
        "fin_conductivity_w_m_k": conductivity,
        "diameter_m": 2.0 * root,
        "fin_height_m": tip - root,
        "fin_thickness_m": thickness,
    }


@pytest.mark.parametrize(
    ("fin", "exact", "with_edge", "schmidt", "tip"),
    [
        (_fin(0.0127, 0.0254, 0.0004, 200.0, 50.0), 0.913867, 0.911087, 0.907708, 0.884525),
        (_fin(0.0254, 0.041275, 0.00127, 40.0, 60.0), 0.803553, 0.790066, 0.794968, 0.729819),
        (_fin(0.0127, 0.0254, 0.0004, 16.0, 80.0), 0.391730, 0.384586, 0.395353, 0.217482),
    ],
    ids=["aluminium", "welded steel", "stainless"],
)
def test_annular_fins_worked_by_hand(
    fin: dict[str, float], exact: float, with_edge: float, schmidt: float, tip: float
) -> None:
    """Gardner's (1945) efficiency, the same on r2 + t/2, Schmidt's form and the tip, by hand."""
    longer = {**fin, "fin_height_m": fin["fin_height_m"] + 0.5 * fin["fin_thickness_m"]}
    assert float(annular_efficiency(**fin)) == pytest.approx(exact, abs=5e-7)
    assert float(annular_efficiency(**longer)) == pytest.approx(with_edge, abs=5e-7)
    assert float(annular_efficiency_schmidt(**fin)) == pytest.approx(schmidt, abs=5e-7)
    assert float(annular_tip_ratio(**fin)) == pytest.approx(tip, abs=5e-7)


def test_annular_fin_solves_its_differential_equation() -> None:
    """A numerical solution of theta'' + theta'/r = m^2 theta gives the efficiency and the tip to 1e-8."""
    fin = _fin(0.008, 0.021, 0.0003, 55.0, 130.0)
    m2 = 2.0 * 130.0 / (55.0 * 0.0003)
    radius = np.linspace(0.008, 0.021, 200)

    def equation(r: Array, y: Array) -> Array:
        return np.vstack([y[1], m2 * y[0] - y[1] / r])

    def ends(at_root: Array, at_tip: Array) -> Array:
        return np.array([at_root[0] - 1.0, at_tip[1]])

    solution = solve_bvp(equation, ends, radius, np.ones((2, radius.size)), tol=1e-10, max_nodes=20000)
    efficiency = -2.0 * 0.008 * solution.sol(0.008)[1] / (m2 * (0.021**2 - 0.008**2))
    assert float(annular_efficiency(**fin)) == pytest.approx(efficiency, rel=1e-8)
    assert float(annular_tip_ratio(**fin)) == pytest.approx(solution.sol(0.021)[0], rel=1e-8)


def test_schmidt_is_within_its_stated_error() -> None:
    """Above 0.5 and to r2/r1 = 3 Schmidt's approximation is low by up to 1.62 % and never high."""
    film = np.geomspace(0.1, 1e4, 300)
    worst, best = 0.0, 0.0
    for ratio in (1.1, 1.5, 2.0, 2.5, 3.0):
        fin = {**_fin(0.0127, 0.0127 * ratio, 0.0004, 200.0, 1.0), "heat_transfer_coefficient_w_m2_k": film}
        exact = annular_efficiency(**fin)
        error = (annular_efficiency_schmidt(**fin) / exact - 1.0)[exact > 0.5]
        worst, best = min(worst, error.min()), max(best, error.max())
    assert -0.0163 < worst < -0.015
    assert best < 1e-6


@pytest.mark.parametrize("film", [1e-12, 1e-3, 50.0, 1e4, 1e8, 1e16])
def test_straight_limit_of_a_large_ring(film: float) -> None:
    """On a root of 1000 km an annular fin is a straight fin: tanh(mL)/(mL), however large or small m is."""
    fin = {**_fin(1e6, 1e6 + 0.0127, 0.0004, 200.0, film)}
    fin["fin_height_m"] = 0.0127
    x = np.sqrt(2.0 * film / (200.0 * 0.0004)) * 0.0127
    assert float(annular_efficiency(**fin)) == pytest.approx(np.tanh(x) / x if x > 1e-6 else 1.0, rel=1e-8)


def _cell_boundary(angle: Array, staggered: bool, across: float, along: float) -> Array:
    """Distance from the tube's axis to the edge of its cell: the nearest bisector to a neighbour."""
    neighbours = (
        [(across / 2, along), (across, 0.0), (0.0, 2 * along)] if staggered else [(across, 0), (0, along)]
    )
    reach = np.full(angle.shape, np.inf)
    for x, y in neighbours:
        toward = x * np.cos(angle) + y * np.sin(angle)
        reach = np.minimum(
            reach, np.where(toward > 1e-12, 0.5 * (x * x + y * y) / np.maximum(toward, 1e-12), np.inf)
        )
    return reach


def _plate_by_finite_elements(
    staggered: bool, root: float, across: float, along: float, m: float
) -> tuple[float, float]:
    """Efficiency and coldest temperature of a quarter of a plate's cell by linear triangles."""
    radial, round_ = 40, 120
    angle = np.linspace(0.0, 0.5 * np.pi, round_ + 1)
    edge = _cell_boundary(angle, staggered, across, along)
    share = np.linspace(0.0, 1.0, radial + 1)[:, None]
    radius = root + share * (edge - root)
    x, y = (radius * np.cos(angle)).ravel(), (radius * np.sin(angle)).ravel()
    number = np.arange(x.size).reshape(radial + 1, round_ + 1)
    a, b, c, d = (
        number[:-1, :-1].ravel(),
        number[1:, :-1].ravel(),
        number[1:, 1:].ravel(),
        number[:-1, 1:].ravel(),
    )
    corners = np.vstack([np.column_stack([a, b, c]), np.column_stack([a, c, d])])
    px, py = x[corners], y[corners]
    gx = np.stack([py[:, 1] - py[:, 2], py[:, 2] - py[:, 0], py[:, 0] - py[:, 1]], axis=1)
    gy = np.stack([px[:, 2] - px[:, 1], px[:, 0] - px[:, 2], px[:, 1] - px[:, 0]], axis=1)
    area = 0.5 * np.abs(gx[:, 0] * gy[:, 1] - gx[:, 1] * gy[:, 0])[:, None, None]
    stiff = (gx[:, :, None] * gx[:, None, :] + gy[:, :, None] * gy[:, None, :]) / (4.0 * area)
    mass = area / 12.0 * (np.ones((3, 3)) + np.eye(3))
    rows, columns = np.repeat(corners, 3, axis=1).ravel(), np.tile(corners, (1, 3)).ravel()
    matrix = coo_matrix(((stiff + m * m * mass).ravel(), (rows, columns))).tocsr()
    weights = np.bincount(corners.ravel(), np.repeat(area.ravel() / 3.0, 3))
    held, free = number[0], number[1:].ravel()
    theta = np.ones(x.size)
    theta[free] = spsolve(matrix[free][:, free], -matrix[free][:, held] @ theta[held])
    return float(weights @ theta / weights.sum()), float(theta.min())


@pytest.mark.parametrize(("across", "along"), [(25.4, 22.0), (30.0, 20.0), (40.0, 34.64), (25.0, 19.0)])
@pytest.mark.parametrize("film", [30.0, 150.0])
def test_staggered_plates_agree_with_plane_conduction(across: float, along: float, film: float) -> None:
    """Equal area and Bessel functions are within 0.5 % of finite elements on the hexagonal cell."""
    thickness, conductivity, root = 0.00012, 200.0, 0.005
    m = float(np.sqrt(2.0 * film / (conductivity * thickness)))
    plane, coldest = _plate_by_finite_elements(True, root, across / 1e3, along / 1e3, m)
    case = {
        "heat_transfer_coefficient_w_m2_k": film,
        "fin_conductivity_w_m_k": conductivity,
        "arrangement": 1.0,
        "diameter_m": 2 * root,
        "fin_thickness_m": thickness,
        "transverse_pitch_m": across / 1e3,
        "longitudinal_pitch_m": along / 1e3,
    }
    assert float(plate_efficiency(**case)) == pytest.approx(plane, rel=0.005)
    corner = float(plate_corner_ratio(**case))
    assert coldest - 0.06 < corner < coldest + 0.01


@pytest.mark.parametrize(
    ("across", "along", "low"), [(25.4, 22.0, 0.013), (30.0, 30.0, 0.011), (36.0, 24.0, 0.027)]
)
def test_inline_plates_are_low_against_plane_conduction(across: float, along: float, low: float) -> None:
    """Schmidt's rectangle with Bessel functions is below finite elements, the more the longer the cell."""
    film, thickness, conductivity, root = 60.0, 0.00012, 200.0, 0.005
    m = float(np.sqrt(2.0 * film / (conductivity * thickness)))
    plane, coldest = _plate_by_finite_elements(False, root, across / 1e3, along / 1e3, m)
    case = {
        "heat_transfer_coefficient_w_m2_k": film,
        "fin_conductivity_w_m_k": conductivity,
        "arrangement": 0.0,
        "diameter_m": 2 * root,
        "fin_thickness_m": thickness,
        "transverse_pitch_m": across / 1e3,
        "longitudinal_pitch_m": along / 1e3,
    }
    ratio = float(plate_efficiency(**case)) / plane
    assert 1.0 - low < ratio < 1.0
    assert coldest - 0.06 < float(plate_corner_ratio(**case)) < coldest + 0.01


def test_plate_cells_worked_by_hand() -> None:
    """A cell of 25.4 x 22 mm: 0.84323 staggered and 0.82794 in-line, by hand from the equivalent radii."""
    case = {
        "heat_transfer_coefficient_w_m2_k": 60.0,
        "fin_conductivity_w_m_k": 200.0,
        "diameter_m": 0.01,
        "fin_thickness_m": 0.00012,
        "transverse_pitch_m": 0.0254,
        "longitudinal_pitch_m": 0.022,
    }
    assert float(plate_efficiency(arrangement=1.0, **case)) == pytest.approx(0.84323, abs=5e-6)
    assert float(plate_efficiency(arrangement=0.0, **case)) == pytest.approx(0.82794, abs=5e-6)


def test_weierman_efficiencies_worked_by_hand() -> None:
    """A serrated fin cut to the root and a solid one, by hand from Weierman's (1976) formulas."""
    cut = {"segment_width_m": 0.004, "cut_depth_m": 0.015875}
    strip = {**STEEL, "fin_thickness_m": 0.00127, **cut}
    assert float(segment_efficiency(**strip)) == pytest.approx(0.788660, abs=5e-7)
    assert float(weierman_serrated_efficiency(**STEEL, **WELDED, **cut)) == pytest.approx(0.771992, abs=5e-7)
    assert float(weierman_solid_efficiency(**STEEL, **WELDED)) == pytest.approx(0.750083, abs=5e-7)


@pytest.mark.parametrize("cut_depth", [0.015875, 0.012, 0.006, 0.001])
def test_serrated_fin_balances_ring_and_strips(cut_depth: float) -> None:
    """Ring and strips as one boundary-value problem lose the same heat and end as cold."""
    cut = {"segment_width_m": 0.004, "cut_depth_m": cut_depth}
    film, conductivity, thickness, width = 60.0, 40.0, 0.00127, 0.004
    root, ring = 0.0254, 0.015875 - cut_depth
    foot, length = root + ring, cut_depth + 0.5 * thickness
    m2 = 2.0 * film / (conductivity * thickness)
    strip2 = 2.0 * film * (thickness + width) / (conductivity * thickness * width)

    def equation(z: Array, y: Array) -> Array:
        # z from 0 to 1 along both parts; the ring has a growing section, the strip none
        r = root + z * ring
        curl = -ring * y[1] / r
        return np.vstack([y[1], ring**2 * m2 * y[0] + curl, y[3], length**2 * strip2 * y[2]])

    def ends(start: Array, end: Array) -> Array:
        flux = end[1] / ring if ring else 0.0
        return np.array([start[0] - 1.0, end[0] - start[2], flux - start[3] / length, end[3]])

    if ring > 0.0:
        mesh = np.linspace(0.0, 1.0, 60)
        solution = solve_bvp(equation, ends, mesh, np.ones((4, mesh.size)), tol=1e-9, max_nodes=50000)
        heat = -conductivity * thickness * 2.0 * np.pi * root * solution.sol(0.0)[1] / ring
        tip = solution.sol(1.0)[2]
    else:
        strip = np.sqrt(strip2)
        heat = conductivity * thickness * 2.0 * np.pi * root * strip * np.tanh(strip * length)
        tip = 1.0 / np.cosh(strip * length)
    faces = 2.0 * np.pi * (foot**2 - root**2) + 2.0 * np.pi * foot / width * 2.0 * length * (
        width + thickness
    )
    assert float(serrated_efficiency(**STEEL, **WELDED, **cut)) == pytest.approx(
        heat / (film * faces), rel=1e-6
    )
    assert float(serrated_tip_ratio(**STEEL, **WELDED, **cut)) == pytest.approx(float(tip), rel=1e-6)
    # the surface the balance counts is the one the areas count, but for t^2 at each strip's tip
    arrays = {name: np.array([value]) for name, value in {**WELDED, **cut, "fin_pitch_m": 1.0}.items()}
    area = serrated_fin_area(**arrays)
    assert area[0] == pytest.approx(faces, rel=0.03)


def test_serrated_fin_cut_to_the_root_is_its_segment_and_uncut_is_annular() -> None:
    """Without an uncut ring the segment's tanh form is left; without cuts the annular fin."""
    cut = {"segment_width_m": 0.004, "cut_depth_m": 0.015875}
    segment = segment_efficiency(**STEEL, fin_thickness_m=0.00127, **cut)
    assert float(serrated_efficiency(**STEEL, **WELDED, **cut)) == pytest.approx(float(segment), rel=1e-12)
    uncut = serrated_efficiency(**STEEL, **WELDED, segment_width_m=0.004, cut_depth_m=0.0)
    assert float(uncut) == pytest.approx(float(annular_efficiency(**STEEL, **WELDED)), rel=1e-12)


def test_wet_fin_worked_with_saturated_air() -> None:
    """At a film of 287.15 K a fin of 0.91427 dry has 0.80753 wet, with the slope from psychrolib."""
    psychrolib.SetUnitSystem(psychrolib.SI)
    low, high = (psychrolib.GetSatAirEnthalpy(14.0 + side, 101325.0) for side in (-0.01, 0.01))
    wet = wet_coefficient(
        heat_transfer_coefficient_w_m2_k=55.0,
        saturation_enthalpy_slope_j_kg_k=(high - low) / 0.02,
        heat_capacity_j_kg_k=1006.0 + 1860.0 * 0.016,
    )
    fin = _fin(0.008, 0.015, 0.00013, 200.0, 55.0)
    assert float(annular_efficiency(**fin)) == pytest.approx(0.91427, abs=5e-6)
    wet_fin = {**fin, "heat_transfer_coefficient_w_m2_k": wet}
    assert float(annular_efficiency(**wet_fin)) == pytest.approx(0.80753, abs=5e-6)


def test_surface_efficiency_weighs_fins_and_prime_surface() -> None:
    """Nine tenths fins of 0.8 leave 0.82 of the whole surface."""
    assert float(surface_efficiency(fin_efficiency=0.8, fin_area_share=0.9)) == pytest.approx(0.82)


def test_each_method_has_the_efficiency_it_was_reduced_with() -> None:
    """Weierman's films go with his efficiencies, all others with the exact ones."""
    assert fin_efficiency_of("weierman-1976", "annular") is weierman_solid_efficiency
    assert fin_efficiency_of("weierman-1976", "serrated") is weierman_serrated_efficiency
    assert fin_efficiency_of("briggs-young-1963", "annular") is annular_efficiency
    assert fin_efficiency_of("wang-chi-chang-2000", "plate") is plate_efficiency
    assert fin_efficiency_of("ganguli-1985", "serrated") is serrated_efficiency


_ANNULAR = (annular_efficiency, annular_tip_ratio, annular_efficiency_schmidt, weierman_solid_efficiency)
_CUT = (serrated_efficiency, serrated_tip_ratio, weierman_serrated_efficiency)


@settings(max_examples=200, deadline=None)
@given(
    film=st.floats(0.0, 1e7),
    conductivity=st.floats(1e-3, 1e6),
    diameter=st.floats(1e-4, 1.0),
    height=st.floats(0.0, 0.2),
    thickness=st.floats(0.0, 0.02),
    width=st.floats(1e-4, 0.1),
    cut=st.floats(0.0, 1.0),
)
def test_efficiencies_stay_between_zero_and_one(
    *,
    film: float,
    conductivity: float,
    diameter: float,
    height: float,
    thickness: float,
    width: float,
    cut: float,
) -> None:
    """Any fin, height 0 and thickness 0 included, has an efficiency and a tip between 0 and 1."""
    fin = {
        "heat_transfer_coefficient_w_m2_k": film,
        "fin_conductivity_w_m_k": conductivity,
        "diameter_m": diameter,
        "fin_height_m": height,
        "fin_thickness_m": thickness,
    }
    for function in _ANNULAR:
        assert 0.0 <= float(function(**fin)) <= 1.0 + 1e-9
    for function in _CUT:
        assert 0.0 <= float(function(**fin, segment_width_m=width, cut_depth_m=cut * height)) <= 1.0 + 1e-9


@pytest.mark.parametrize("function", [*_ANNULAR, *_CUT])
@pytest.mark.parametrize(
    "limit",
    [{"fin_height_m": 0.0}, {"fin_conductivity_w_m_k": 1e300}, {"heat_transfer_coefficient_w_m2_k": 0.0}],
    ids=["no height", "endless conductivity", "no film"],
)
def test_ideal_fins_have_efficiency_one(function: Any, limit: dict[str, float]) -> None:
    """Height 0, endless conductivity and coefficient 0 all give 1 exactly."""
    fin = {**STEEL, **WELDED, **limit}
    if function in _CUT:
        fin |= {"segment_width_m": 0.004, "cut_depth_m": 0.7 * fin["fin_height_m"]}
    assert float(function(**fin)) == pytest.approx(1.0, abs=1e-12)


@settings(max_examples=100, deadline=None)
@given(power=st.floats(-3.0, 5.0), ratio=st.floats(1.0001, 4.0))
def test_efficiency_falls_with_the_film(power: float, ratio: float) -> None:
    """A stronger film lowers the efficiency, across the seams between the forms the ring is computed by."""
    fin = _fin(0.0127, 0.0127 * ratio, 0.0004, 200.0, 1.0)
    films = 10.0**power * np.array([1.0, 1.01])
    values = annular_efficiency(**{**fin, "heat_transfer_coefficient_w_m2_k": films})
    assert values[1] <= values[0] * (1.0 + 1e-10)
