"""Humid-air states: saturation, and the humidity ratio from whatever was measured, and back.

All functions take floats or arrays that broadcast together, in SI. They treat air and vapour as ideal
gases: the enhancement factor is left out, so saturated humidity ratios are 0.4 % (293 K) to 1.1 % (353 K)
below the ASHRAE tables at sea level. Relative humidity is over liquid water from 273.16 K up and over ice
below.
"""

import numpy as np
from numpy.typing import ArrayLike

from crossbank_service.properties._gas_data import DRY_AIR, WATER, R
from crossbank_service.properties.medium import Array
from crossbank_service.properties.moist_air import MASS_RATIO

TRIPLE_K = 273.16
STANDARD_PRESSURE_PA = 101325.0
LOWEST_DEW_POINT_K = 100.0
"""Dew and wet-bulb points below this are given as this."""

_HIGHEST_K = 647.096
_WATER: tuple[float, ...] = (-5.8002206e3, 1.3914993, -4.8640239e-2, 4.1764768e-5, -1.4452093e-8, 6.5459673)
_ICE: tuple[float, ...] = (
    -5.6745359e3,
    6.3925247,
    -9.6778430e-3,
    6.2215701e-7,
    2.0747825e-9,
    -9.4840240e-13,
    4.1635019,
)
_HEAT_OF_VAPORISATION = 2.50092e6  # J/kg, of water at the triple point
_HEAT_OF_SUBLIMATION = 2.8344e6  # J/kg, of ice at the triple point
_WATER_HEAT_CAPACITY = 4186.0  # J/(kg K), mean of the liquid from 273 to 373 K
_ICE_HEAT_CAPACITY = 2100.0  # J/(kg K)


def _array(value: ArrayLike) -> Array:
    return np.asarray(value, dtype=np.float64)


def standard_pressure(elevation_m: ArrayLike) -> Array:
    """Pressure of the standard atmosphere.

    Parameters
    ----------
    elevation_m : array_like
        Above sea level [m]; valid from -500 to 11000 m.

    Returns
    -------
    Array
        [Pa]

    Notes
    -----
    p = 101325 (1 - 2.25577e-5 z)^5.2559 (ASHRAE Handbook Fundamentals, Psychrometrics, equation (3)).
    """
    base = np.maximum(1.0 - 2.25577e-5 * _array(elevation_m), 1e-3)
    return STANDARD_PRESSURE_PA * np.exp(5.2559 * np.log(base))


def _log_saturation(temperature_k: Array) -> tuple[Array, Array]:
    """Logarithm of the saturation pressure, and its slope against temperature."""
    t = np.clip(temperature_k, LOWEST_DEW_POINT_K, _HIGHEST_K)
    log_t = np.log(t)
    c = _WATER
    water = c[0] / t + c[1] + t * (c[2] + t * (c[3] + t * c[4])) + c[5] * log_t
    d_water = -c[0] / (t * t) + c[2] + t * (2 * c[3] + t * 3 * c[4]) + c[5] / t
    c = _ICE
    ice = c[0] / t + c[1] + t * (c[2] + t * (c[3] + t * (c[4] + t * c[5]))) + c[6] * log_t
    d_ice = -c[0] / (t * t) + c[2] + t * (2 * c[3] + t * (3 * c[4] + t * 4 * c[5])) + c[6] / t
    liquid = t >= TRIPLE_K
    value, slope = np.where(liquid, water, ice), np.where(liquid, d_water, d_ice)
    # beyond both ends along the Clausius-Clapeyron line of the end
    far = np.maximum(temperature_k, 1.0)
    return value + slope * t * (far - t) / far, slope * (t / far) ** 2


def saturation_pressure(temperature_k: ArrayLike) -> Array:
    """Saturation pressure of water, over ice below 273.16 K.

    Parameters
    ----------
    temperature_k : array_like
        [K]

    Returns
    -------
    Array
        [Pa]

    Notes
    -----
    Hyland and Wexler 1983, ASHRAE Handbook Fundamentals, Psychrometrics, equations (5) and (6). Published
    for 173 to 473 K; against IAPWS-95 within 0.03 % to 473 K, 0.08 % to 600 K and 1.5 % at the critical
    temperature. The two forms meet at 273.16 K within 6e-9. Above the critical temperature, where
    saturation has no meaning, it goes on along the Clausius-Clapeyron line so that relative humidities stay
    finite.
    """
    return np.asarray(np.exp(_log_saturation(_array(temperature_k))[0]))


def vapour_pressure(humidity_ratio: ArrayLike, pressure_pa: ArrayLike) -> Array:
    """Partial pressure of water vapour [Pa], P W/(W + 0.621945)."""
    w = _array(humidity_ratio)
    return np.asarray(_array(pressure_pa) * w / (w + MASS_RATIO))


def humidity_ratio_from_vapour_pressure(vapour_pressure_pa: ArrayLike, pressure_pa: ArrayLike) -> Array:
    """Humidity ratio 0.621945 p_w/(P - p_w) [-]; ``inf`` where the vapour would fill the whole pressure."""
    pw, p = np.broadcast_arrays(_array(vapour_pressure_pa), _array(pressure_pa))
    possible = pw < p
    return np.where(possible, MASS_RATIO * pw / np.where(possible, p - pw, 1.0), np.inf)


def humidity_ratio_from_relative_humidity(
    temperature_k: ArrayLike, relative_humidity: ArrayLike, pressure_pa: ArrayLike
) -> Array:
    """Humidity ratio from relative humidity (0 to 1).

    Parameters
    ----------
    temperature_k, relative_humidity, pressure_pa : array_like
        Dry-bulb temperature [K], share of the saturation pressure [-], total pressure [Pa].

    Returns
    -------
    Array
        [kg/kg dry air]; ``inf`` where the vapour pressure reaches the total pressure: no such air exists.
    """
    return humidity_ratio_from_vapour_pressure(
        _array(relative_humidity) * saturation_pressure(temperature_k), pressure_pa
    )


def humidity_ratio_from_dew_point(dew_point_temperature_k: ArrayLike, pressure_pa: ArrayLike) -> Array:
    """Humidity ratio [kg/kg dry air] from the dew point, frost point below 273.16 K; ``inf`` if none."""
    return humidity_ratio_from_vapour_pressure(saturation_pressure(dew_point_temperature_k), pressure_pa)


def _air_gain(temperature_k: Array) -> Array:
    """Enthalpy of dry air above 273.16 K [J/kg]."""
    t = np.maximum(temperature_k, LOWEST_DEW_POINT_K)
    heat, start = DRY_AIR.heat_capacity, np.full((1,) * max(t.ndim, 1), TRIPLE_K)
    gain = heat.integral_over_r(t) - heat.integral_over_r(start)
    return np.asarray(gain.reshape(t.shape) * R / DRY_AIR.molar_mass_kg_mol)


def _vapour_gain(temperature_k: Array) -> Array:
    """Enthalpy of low-density vapour above 273.16 K [J/kg]."""
    t = np.maximum(temperature_k, LOWEST_DEW_POINT_K)
    heat, start = WATER.heat_capacity, np.full((1,) * max(t.ndim, 1), TRIPLE_K)
    gain = heat.integral_over_r(t) - heat.integral_over_r(start)
    return np.asarray(gain.reshape(t.shape) * R / WATER.molar_mass_kg_mol)


def vapour_enthalpy(temperature_k: ArrayLike) -> Array:
    """Enthalpy of low-density water vapour above liquid at the triple point [J/kg]."""
    return np.asarray(_HEAT_OF_VAPORISATION + _vapour_gain(_array(temperature_k)))


def vapour_heat_capacity(temperature_k: ArrayLike) -> Array:
    """Heat capacity of low-density water vapour, the slope of ``vapour_enthalpy`` [J/(kg K)]."""
    t = np.maximum(_array(temperature_k), LOWEST_DEW_POINT_K)
    return np.asarray(WATER.heat_capacity.over_r(t) * R / WATER.molar_mass_kg_mol)


def condensate_enthalpy(temperature_k: ArrayLike) -> Array:
    """Enthalpy of liquid water above the triple point, by a mean heat capacity [J/kg]."""
    return np.asarray(_WATER_HEAT_CAPACITY * (_array(temperature_k) - TRIPLE_K))


def humidity_ratio_from_wet_bulb(
    temperature_k: ArrayLike, wet_bulb_temperature_k: ArrayLike, pressure_pa: ArrayLike
) -> Array:
    """Humidity ratio from dry and wet bulb (thermodynamic wet bulb, that is adiabatic saturation).

    Parameters
    ----------
    temperature_k, wet_bulb_temperature_k, pressure_pa : array_like
        Dry bulb [K], wet bulb [K], total pressure [Pa].

    Returns
    -------
    Array
        [kg/kg dry air]; ``inf`` where the wet bulb is at or above the boiling point; negative where
        no air, however dry, has so low a wet bulb; above saturation where the wet bulb exceeds the dry bulb.

    Notes
    -----
    h_a(t) + W h_v(t) + (W_s - W) h_c(t_w) = h_a(t_w) + W_s h_v(t_w), with enthalpies of dry air and vapour
    from their ideal-gas heat capacities, so it holds for hot dryer air (to 600 K and beyond) as well as for
    rooms; h_c is the enthalpy of water, of ice below 273.16 K. With constant heat capacities this is
    ASHRAE Handbook Fundamentals, Psychrometrics, equations (33) and (35). Near 273.16 K wet bulb the two
    branches differ by the heat of fusion, so the humidity ratio steps there.
    """
    t, tw = np.broadcast_arrays(_array(temperature_k), _array(wet_bulb_temperature_k))
    saturated = humidity_ratio_from_dew_point(tw, pressure_pa)
    possible = np.isfinite(saturated)
    ws = np.where(possible, saturated, 0.0)
    frozen = tw < TRIPLE_K
    condensed = np.where(frozen, _ICE_HEAT_CAPACITY, _WATER_HEAT_CAPACITY) * (tw - TRIPLE_K)
    # vapour over condensate; the triple point is the zero of the condensate
    base = np.where(frozen, _HEAT_OF_SUBLIMATION, _HEAT_OF_VAPORISATION) - condensed
    top = ws * (base + _vapour_gain(tw)) - (_air_gain(t) - _air_gain(tw))
    w = top / (base + _vapour_gain(t))
    return np.where(possible, w, np.inf)


def relative_humidity(temperature_k: ArrayLike, humidity_ratio: ArrayLike, pressure_pa: ArrayLike) -> Array:
    """Relative humidity p_w/p_ws(T) [-]; may exceed 1 where the air would be fogged."""
    return np.asarray(vapour_pressure(humidity_ratio, pressure_pa) / saturation_pressure(temperature_k))


def dew_point(humidity_ratio: ArrayLike, pressure_pa: ArrayLike) -> Array:
    """Dew point, frost point below 273.16 K.

    Parameters
    ----------
    humidity_ratio, pressure_pa : array_like
        [kg/kg dry air], [Pa]

    Returns
    -------
    Array
        [K]; inverse of ``humidity_ratio_from_dew_point`` within 1e-9 relative; 100 K for dry air, which has
        none.
    """
    return saturation_temperature(vapour_pressure(humidity_ratio, pressure_pa))


def saturation_temperature(vapour_pressure_pa: ArrayLike) -> Array:
    """Temperature [K] at which ``saturation_pressure`` has the given value; not below 100 K."""
    floor, ceiling = saturation_pressure(LOWEST_DEW_POINT_K), saturation_pressure(_HIGHEST_K)
    goal = np.log(np.clip(_array(vapour_pressure_pa), floor, ceiling))
    t = np.full_like(goal, 300.0)
    for _ in range(12):  # Newton on 1/T, along which ln p is almost straight
        value, slope = _log_saturation(t)
        inverse = 1.0 / t + (value - goal) / (slope * t * t)
        t = 1.0 / np.clip(inverse, 1.0 / _HIGHEST_K, 1.0 / LOWEST_DEW_POINT_K)
    return t


def wet_bulb(temperature_k: ArrayLike, humidity_ratio: ArrayLike, pressure_pa: ArrayLike) -> Array:
    """Thermodynamic wet-bulb temperature.

    Parameters
    ----------
    temperature_k, humidity_ratio, pressure_pa : array_like
        [K], [kg/kg dry air], [Pa]

    Returns
    -------
    Array
        [K]; inverse of ``humidity_ratio_from_wet_bulb`` by bisection to 1e-9 K.
    """
    t, w, p = np.broadcast_arrays(_array(temperature_k), _array(humidity_ratio), _array(pressure_pa))
    low = np.full(t.shape, LOWEST_DEW_POINT_K)
    high = np.maximum(t, LOWEST_DEW_POINT_K)
    for _ in range(55):
        middle = 0.5 * (low + high)
        too_wet = humidity_ratio_from_wet_bulb(t, middle, p) > w
        low, high = np.where(too_wet, low, middle), np.where(too_wet, middle, high)
    return np.asarray(0.5 * (low + high))
