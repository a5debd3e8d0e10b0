"""Humid-air states against independent libraries and against themselves."""

import numpy as np
import psychrolib
import pytest
from CoolProp.CoolProp import PropsSI
from CoolProp.HumidAirProp import HAPropsSI
from hypothesis import given
from hypothesis import strategies as st

from crossbank_service.properties import psychrometrics as ps


@pytest.fixture(autouse=True)
def _si() -> None:
    psychrolib.SetUnitSystem(psychrolib.SI)


@pytest.mark.parametrize("celsius", [-60.0, -20.0, -5.0, 1.0, 20.0, 60.0, 120.0, 190.0])
def test_saturation_pressure_equals_the_library(celsius: float) -> None:
    """The Hyland and Wexler forms as psychrolib codes them."""
    assert float(ps.saturation_pressure(celsius + 273.15)) == pytest.approx(
        psychrolib.GetSatVapPres(celsius), rel=1e-9
    )


def test_saturation_pressure_is_continuous_at_the_triple_point() -> None:
    """Ice and water meet at 273.16 K within 1e-8."""
    below, above = ps.saturation_pressure(np.array([np.nextafter(273.16, 0.0), 273.16]))
    assert below == pytest.approx(above, rel=1e-8)


@pytest.mark.parametrize(
    ("temperature", "error"), [(300.0, 3e-4), (373.124, 3e-4), (470.0, 3e-4), (573.0, 8e-4), (640.0, 0.015)]
)
def test_saturation_pressure_is_near_the_water_equation(temperature: float, error: float) -> None:
    """Against IAPWS-95 within the stated error, beyond the published range too."""
    reference = PropsSI("P", "T", temperature, "Q", 0, "Water")
    assert float(ps.saturation_pressure(temperature)) == pytest.approx(reference, rel=error)


@given(st.floats(110.0, 640.0))
def test_saturation_temperature_inverts_the_pressure(temperature: float) -> None:
    """Temperature to pressure and back within 1e-9, across the triple point."""
    back = float(ps.saturation_temperature(ps.saturation_pressure(temperature)))
    assert back == pytest.approx(temperature, rel=1e-9)


@given(st.floats(1.0, 3000.0))
def test_saturation_pressure_rises_and_stays_finite(temperature: float) -> None:
    """Finite and not falling, far beyond any use."""
    low, high = ps.saturation_pressure(np.array([temperature, temperature + 1.0]))
    assert np.isfinite(high)
    assert 0.0 <= low <= high


@pytest.mark.parametrize("pressure", [70e3, 101325.0, 250e3])
@pytest.mark.parametrize(("celsius", "humidity"), [(-15.0, 0.8), (5.0, 0.4), (25.0, 0.6), (80.0, 0.3)])
def test_humidity_ratio_equals_the_library(celsius: float, humidity: float, pressure: float) -> None:
    """From relative humidity and from dew point, as psychrolib, at altitude and under pressure."""
    reference = psychrolib.GetHumRatioFromRelHum(celsius, humidity, pressure)
    t = celsius + 273.15
    w = ps.humidity_ratio_from_relative_humidity(t, humidity, pressure)
    assert float(w) == pytest.approx(reference, rel=1e-8)
    dew = ps.dew_point(w, pressure)
    assert float(ps.humidity_ratio_from_dew_point(dew, pressure)) == pytest.approx(reference, rel=1e-8)
    assert float(ps.relative_humidity(t, w, pressure)) == pytest.approx(humidity, rel=1e-12)


@pytest.mark.parametrize("pressure", [80e3, 101325.0])
@pytest.mark.parametrize(("celsius", "wet"), [(35.0, 24.0), (60.0, 40.0), (15.0, 8.0), (-5.0, -6.0)])
def test_wet_bulb_agrees_with_the_constant_heat_capacity_form(
    celsius: float, wet: float, pressure: float
) -> None:
    """Near room temperature the balance with real heat capacities is ASHRAE's equation within 1 %."""
    reference = psychrolib.GetHumRatioFromTWetBulb(celsius, wet, pressure)
    w = ps.humidity_ratio_from_wet_bulb(celsius + 273.15, wet + 273.15, pressure)
    assert float(w) == pytest.approx(reference, rel=0.01, abs=2e-5)


@pytest.mark.parametrize(
    ("temperature", "w"), [(300.0, 0.01), (353.15, 0.02), (453.15, 0.02), (573.15, 0.05), (573.15, 0.2)]
)
def test_wet_bulb_of_hot_air_agrees_with_real_humid_air(temperature: float, w: float) -> None:
    """Dryer air to 573 K: within 0.35 K of CoolProp's real-gas humid air."""
    reference = HAPropsSI("B", "T", temperature, "P", 101325.0, "W", w)
    assert float(ps.wet_bulb(temperature, w, 101325.0)) == pytest.approx(reference, abs=0.35)


@given(st.floats(280.0, 900.0), st.floats(1e-5, 0.5), st.floats(60e3, 300e3))
def test_wet_bulb_and_humidity_ratio_invert_each_other(t: float, w: float, pressure: float) -> None:
    """Humidity ratio to wet bulb and back, away from the step at the freezing point."""
    wet = ps.wet_bulb(t, w, pressure)
    back = float(ps.humidity_ratio_from_wet_bulb(t, wet, pressure))
    if float(ps.relative_humidity(t, w, pressure)) < 1.0 and abs(float(wet) - 273.16) > 1e-6:
        assert back == pytest.approx(w, rel=1e-6, abs=1e-9)


def test_saturated_air_has_its_own_temperature_as_wet_bulb() -> None:
    """Dry bulb, wet bulb and dew point meet at saturation."""
    w = ps.humidity_ratio_from_relative_humidity(310.0, 1.0, 101325.0)
    assert float(ps.wet_bulb(310.0, w, 101325.0)) == pytest.approx(310.0, abs=1e-6)
    assert float(ps.dew_point(w, 101325.0)) == pytest.approx(310.0, abs=1e-6)


def test_air_whose_vapour_would_fill_the_pressure_has_no_humidity_ratio() -> None:
    """Above the boiling point saturated air does not exist; below full saturation hot air does."""
    w = ps.humidity_ratio_from_relative_humidity(np.array([400.0, 400.0]), np.array([1.0, 0.2]), 101325.0)
    assert np.isinf(w[0])
    assert w[1] == pytest.approx(0.621945 * 0.2 / (101325.0 / ps.saturation_pressure(400.0) - 0.2), rel=1e-12)
    assert np.isinf(ps.humidity_ratio_from_wet_bulb(500.0, 380.0, 101325.0))


def test_impossibly_low_wet_bulb_gives_a_negative_humidity_ratio() -> None:
    """No air is dry enough for a wet bulb of 280 K at 350 K, and the sign says so."""
    assert float(ps.humidity_ratio_from_wet_bulb(350.0, 280.0, 101325.0)) < 0.0


def test_dry_air_has_no_dew_point() -> None:
    """Without vapour the lowest dew point is given."""
    assert float(ps.dew_point(0.0, 101325.0)) == ps.LOWEST_DEW_POINT_K


@pytest.mark.parametrize("elevation", [-300.0, 0.0, 1500.0, 4000.0])
def test_standard_pressure_equals_the_library(elevation: float) -> None:
    """The standard atmosphere as psychrolib has it."""
    reference = psychrolib.GetStandardAtmPressure(elevation)
    assert float(ps.standard_pressure(elevation)) == pytest.approx(reference, rel=1e-9)
