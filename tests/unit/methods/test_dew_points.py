"""Dew points: other printed forms of the same laws, what governs, inverses, saturation curve, frost."""

import numpy as np
import pytest
from iapws.iapws97 import _PSat_T, _TSat_P

from crossbank_service.methods import dew_point_laws, dew_points
from crossbank_service.methods.dew_point_laws import ATMOSPHERE_PA

WATER = np.array([0.03, 0.06, 0.10, 0.15, 0.25])[:, np.newaxis] * ATMOSPHERE_PA
ACID = np.array([0.5e-6, 3e-6, 10e-6, 100e-6]) * ATMOSPHERE_PA


def test_verhoff_banchero_agrees_with_its_atmosphere_form() -> None:
    """1.7842 + 0.0269 lg pW - 0.1029 lg pS + 0.0329 lg pW lg pS, in atmospheres, within 0.04 K."""
    lg_w, lg_s = np.log10(WATER / ATMOSPHERE_PA), np.log10(ACID / ATMOSPHERE_PA)
    other = 1000.0 / (1.7842 + 0.0269 * lg_w - 0.1029 * lg_s + 0.0329 * lg_w * lg_s)
    np.testing.assert_allclose(dew_point_laws.verhoff_banchero_1974(WATER, ACID), other, rtol=0.0, atol=0.04)


def test_okkes_agrees_with_its_pascal_form() -> None:
    """10.8809 + 27.6 lg pW + 10.83 lg pS + 1.06 (lg pS + 2.9943)^2.19 in pascals, within 2 mK."""
    other = (
        10.8809 + 27.6 * np.log10(WATER) + 10.83 * np.log10(ACID) + 1.06 * (np.log10(ACID) + 2.9943) ** 2.19
    )
    np.testing.assert_allclose(dew_point_laws.okkes_1987(WATER, ACID) - 273.15, other, rtol=0.0, atol=0.002)


@pytest.mark.parametrize("law", dew_point_laws.LAWS, ids=lambda law: law.slug)
def test_every_law_is_finite_and_rises_with_both_vapours(law: dew_point_laws.DewPointLaw) -> None:
    """From nothing to far beyond the range the laws stay finite; inside it they rise with water and acid."""
    pressures = np.concatenate([[0.0], np.geomspace(1e-8, 1e7, 40)])
    assert np.all(np.isfinite(law.function(pressures[:, np.newaxis], pressures)))
    inside = law.function(WATER, np.geomspace(*law.acid_mole_fraction, 8) * ATMOSPHERE_PA)
    assert np.all(np.diff(inside, axis=0) > 0.0)
    assert np.all(np.diff(inside, axis=1) > 0.0)


def test_in_range_looks_at_both_fractions() -> None:
    """Composition outside either range is out of range."""
    law = dew_point_laws.LAWS[0]
    assert law.in_range(np.array([0.10, 0.02, 0.10]), np.array([1e-5, 1e-5, 2e-4])).tolist() == [
        True,
        False,
        False,
    ]


def test_the_larger_of_water_verhoff_banchero_and_okkes_governs() -> None:
    """At 10 ppm Verhoff-Banchero governs, at 0.1 ppm Okkes, without acid the water."""
    water_dew = np.full(3, 319.2)
    found = dew_points.sulfuric_dew_points(
        water_dew, np.full(3, 10132.5), np.array([10e-6, 0.1e-6, 0.0]) * 101325.0
    )
    assert found.governing_k[0] == found.verhoff_banchero_k[0]
    assert found.governing_k[1] == found.okkes_k[1]
    assert found.governing_k[2] == 319.2
    assert found.acid_governs.tolist() == [True, True, False]
    # 133.3 to 137.3 C by the four laws
    assert found.spread_k[0] == pytest.approx(137.304 - 133.254, abs=0.002)


def test_an_acid_dew_point_below_that_of_the_water_gives_way() -> None:
    """With a trace of acid and much water the water governs."""
    found = dew_points.sulfuric_dew_points(372.0, 98e3, 1e-6)
    assert found.governing_k == 372.0
    assert not found.acid_governs


def test_nitric_acid_never_condenses_below_the_water() -> None:
    """The law sinks below the water dew point at 100 ppm; 4 K above the water holds there, 7 K at 500 ppm."""
    ppm = np.array([0.0, 50.0, 100.0, 500.0, 1000.0])
    water_dew = 273.15 + 49.684  # 12 % water, IAPWS-IF97
    found = dew_points.nitric_dew_point_k(water_dew, 12159.0, ppm * 0.101325)
    np.testing.assert_allclose(found[:4] - water_dew, [0.0, 2.0, 4.0, 7.0], atol=1e-9)
    assert found[4] == pytest.approx(273.15 + 57.741, abs=0.001)


def test_a_decade_of_sulfur_trioxide_is_about_23_kelvin() -> None:
    """General boiler texts: a decade in acid moves the dew point by some 20 to 25 K, a factor two by 7 K."""
    found = dew_point_laws.verhoff_banchero_1974(10132.5, np.array([1e-6, 1e-5, 2e-5]) * 101325.0)
    assert found[1] - found[0] == pytest.approx(21.7, abs=0.05)
    assert found[2] - found[1] == pytest.approx(7.0, abs=0.05)


def test_the_largest_acid_content_brings_the_dew_point_to_the_metal() -> None:
    """The inverse puts the larger of the two laws exactly on the target, or says any or none will do."""
    water = np.array([[6000.0], [15000.0]])
    target = np.array([[370.0, 390.0, 410.0, 420.0]])
    acid = dew_points.largest_acid_pressure_pa(water, target)
    larger = np.maximum(
        dew_point_laws.verhoff_banchero_1974(water, acid), dew_point_laws.okkes_1987(water, acid)
    )
    np.testing.assert_allclose(larger, np.broadcast_to(target, larger.shape), atol=1e-7)
    assert dew_points.largest_acid_pressure_pa(10132.5, 200.0) == pytest.approx(1e-6)
    assert dew_points.largest_acid_pressure_pa(10132.5, 900.0) == pytest.approx(1e5)


def test_the_saturation_curve_is_read_to_a_fifth_of_a_millikelvin() -> None:
    """Against IAPWS-IF97 with points 1 K apart; the ends continue."""
    points = np.arange(274.0, 420.0)
    curve = np.array([_PSat_T(t) * 1e6 for t in points])
    pressure = np.geomspace(700.0, 4e5, 50)
    found = dew_points.temperature_on_saturation_curve(pressure, points, curve)
    np.testing.assert_allclose(found, [_TSat_P(p * 1e-6) for p in pressure], rtol=0.0, atol=2e-4)
    ends = dew_points.temperature_on_saturation_curve(np.array([0.0, 600.0, 5e5, 1e30]), points, curve)
    assert np.all(np.isfinite(ends))
    assert np.all(np.diff(ends) > 0.0)
    assert ends[2] == pytest.approx(_TSat_P(0.5), abs=0.05)


def test_frost_needs_a_surface_below_both_ice_and_dew_point() -> None:
    """Cold but dry air, or dew above freezing on a warm surface, makes no frost."""
    surface, dew = np.array([268.0, 268.0, 275.0, 272.0]), np.array([270.0, 265.0, 280.0, 280.0])
    found = dew_points.frost_margin_k(surface, dew)
    np.testing.assert_allclose(found, [-2.0, 3.0, 1.85, -1.15], atol=1e-12)


def test_a_case_alone_equals_the_case_beside_others() -> None:
    """Bit for bit."""
    together = dew_points.sulfuric_dew_points(319.0, WATER, ACID).governing_k
    alone = dew_points.sulfuric_dew_points(319.0, WATER[2:3], ACID[1:2]).governing_k
    assert alone[0, 0] == together[2, 1]
