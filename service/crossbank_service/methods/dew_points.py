"""Acid and water dew points of a gas, what governs, frost, and the thresholds on the metal."""

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from crossbank_service.methods.criterion import Criterion, Values
from crossbank_service.methods.dew_point_laws import (
    ATMOSPHERE_PA,
    ICE_POINT_K,
    LEAST_PA,
    MOST_ACID_PA,
    haase_borgmann_1981,
    kiang_1981_nitric,
    okkes_1987,
    verhoff_banchero_1974,
    zarenezhad_2009,
)
from crossbank_service.methods.record import Array


def nitric_dew_point_k(
    water_dew_point_k: Values, water_pressure_pa: Values, acid_pressure_pa: Values
) -> Array:
    """Nitric acid dew point, kept above that of the water where the published law sinks below it.

    Parameters
    ----------
    water_dew_point_k : array_like
        Dew point of the water alone [K].
    water_pressure_pa, acid_pressure_pa : array_like
        Partial pressures of water and nitric acid [Pa].

    Returns
    -------
    Array
        Dew point [K].

    Notes
    -----
    The larger of Kiang's law and the water dew point raised by 4 K at 100 ppm and 7 K at 500 ppm of one
    atmosphere (from Henry's constant of nitric acid, Clegg & Brimblecombe, J. Phys. Chem. 94 (1990) 5369,
    from memory), straight in the logarithm between, in proportion below 100 ppm, held above 500 ppm.
    """
    ppm = np.maximum(np.asarray(acid_pressure_pa, dtype=np.float64), 0.0) / ATMOSPHERE_PA * 1e6
    between = 4.0 + 3.0 * np.log(np.clip(ppm, 100.0, 500.0) / 100.0) / np.log(5.0)
    rise = np.where(ppm < 100.0, 0.04 * ppm, between)
    law = np.where(ppm > 0.0, kiang_1981_nitric(water_pressure_pa, acid_pressure_pa), 0.0)
    return np.asarray(np.maximum(law, water_dew_point_k + rise))


@dataclass(frozen=True, kw_only=True)
class SulfuricDewPoints:
    """What the four laws say of the same gas, and what governs.

    Attributes
    ----------
    verhoff_banchero_k, okkes_k, zarenezhad_k, haase_borgmann_k : Array
        The four laws [K].
    governing_k : Array
        The largest of the water dew point, Verhoff-Banchero and Okkes [K]; the water dew point where there
        is no acid.
    spread_k : Array
        Largest less smallest of the four [K].
    acid_governs : Array
        True where the governing dew point is the acid's.
    """

    verhoff_banchero_k: Array
    okkes_k: Array
    zarenezhad_k: Array
    haase_borgmann_k: Array
    governing_k: Array
    spread_k: Array
    acid_governs: NDArray[np.bool_]


def sulfuric_dew_points(
    water_dew_point_k: Values, water_pressure_pa: Values, acid_pressure_pa: Values
) -> SulfuricDewPoints:
    """All four laws for sulfuric acid and the governing dew point.

    Parameters
    ----------
    water_dew_point_k : array_like
        Dew point of the water alone [K].
    water_pressure_pa, acid_pressure_pa : array_like
        Partial pressures of water and of sulfuric acid counted as sulfur trioxide [Pa].

    Returns
    -------
    SulfuricDewPoints
        Arrays of the broadcast shape.

    Notes
    -----
    An acid dew point below that of the water has no meaning, so the larger is taken (a rule of this service).
    """
    water_dew, water, acid = np.broadcast_arrays(
        np.asarray(water_dew_point_k, dtype=np.float64),
        np.asarray(water_pressure_pa, dtype=np.float64),
        np.asarray(acid_pressure_pa, dtype=np.float64),
    )
    vb, ok = verhoff_banchero_1974(water, acid), okkes_1987(water, acid)
    zn, hb = zarenezhad_2009(water, acid), haase_borgmann_1981(water, acid)
    highest = np.maximum(vb, ok)
    governs = (acid > 0.0) & (highest > water_dew)
    return SulfuricDewPoints(
        verhoff_banchero_k=vb,
        okkes_k=ok,
        zarenezhad_k=zn,
        haase_borgmann_k=hb,
        governing_k=np.where(governs, highest, water_dew),
        spread_k=np.maximum(highest, np.maximum(zn, hb)) - np.minimum(np.minimum(vb, ok), np.minimum(zn, hb)),
        acid_governs=governs,
    )


def sulfur_trioxide_mole_fraction(
    sulfur_dioxide_mole_fraction: Values, share: Values = 0.02, *, share_by_mass: bool = False
) -> Array:
    """Sulfur trioxide that goes with a content of sulfur dioxide.

    Parameters
    ----------
    sulfur_dioxide_mole_fraction : array_like
        Mole fraction of sulfur dioxide in the gas.
    share : array_like
        Sulfur trioxide over sulfur dioxide.
    share_by_mass : bool
        True where the share is by mass; then it is worth 64.06/80.06 by mole.

    Returns
    -------
    Array
        Mole fraction of sulfur trioxide.

    Notes
    -----
    Shares run from 0.005 to 0.05: coal near 0.01 to 0.03, heavy oil 0.02 to 0.05 through vanadium, gas and
    light oil 0.005 to 0.03 (general boiler texts; common practice for oil). A factor of two moves the dew
    point by about 7 K.
    """
    by_mole = np.asarray(share, dtype=np.float64) * (64.064 / 80.063 if share_by_mass else 1.0)
    return np.asarray(np.maximum(sulfur_dioxide_mole_fraction, 0.0) * by_mole)


def temperature_on_saturation_curve(
    pressure_pa: Values, curve_temperature_k: Values, curve_pressure_pa: Values
) -> Array:
    """Dew point at a partial pressure, read from a tabulated saturation curve.

    Parameters
    ----------
    pressure_pa : array_like
        Partial pressure [Pa], any shape.
    curve_temperature_k, curve_pressure_pa : array_like
        The saturation curve [K], [Pa], one-dimensional and rising; over water or over ice as the caller
        chooses.

    Returns
    -------
    Array
        Saturation temperature [K], shape of ``pressure_pa``; the end segments continue beyond the curve.

    Notes
    -----
    Logarithm of the pressure straight in the reciprocal temperature between the points (Clausius and
    Clapeyron). On points 1 K apart the error for water is below 0.2 mK.
    """
    pressure = np.maximum(np.asarray(pressure_pa, dtype=np.float64), LEAST_PA)
    inverse = 1.0 / np.asarray(curve_temperature_k, dtype=np.float64)
    ln_p = np.log(np.asarray(curve_pressure_pa, dtype=np.float64))
    wanted = np.log(pressure)
    left = np.clip(np.searchsorted(ln_p, wanted) - 1, 0, ln_p.size - 2)
    share = (wanted - ln_p[left]) / (ln_p[left + 1] - ln_p[left])
    # far above the curve the reciprocal would pass through zero; far below it only grows
    reciprocal = np.maximum(inverse[left] + share * (inverse[left + 1] - inverse[left]), 1e-4)
    return np.asarray(1.0 / reciprocal)


def largest_acid_pressure_pa(water_pressure_pa: Values, dew_point_k: Values) -> Array:
    """Most sulfuric acid the gas may hold for its dew point to stay at a temperature.

    Parameters
    ----------
    water_pressure_pa : array_like
        Partial pressure of water [Pa].
    dew_point_k : array_like
        Dew point not to be exceeded, by either Verhoff-Banchero or Okkes [K].

    Returns
    -------
    Array
        Partial pressure of sulfur trioxide [Pa], from 1e-6 to 1e5: the larger end means any amount will do.

    Notes
    -----
    Both laws rise with the acid, so their larger value is solved by halving the logarithm of the pressure.
    """
    water, target = np.broadcast_arrays(
        np.asarray(water_pressure_pa, dtype=np.float64), np.asarray(dew_point_k, dtype=np.float64)
    )
    low = np.full(water.shape, np.log(LEAST_PA))
    high = np.full(water.shape, np.log(MOST_ACID_PA))
    for _ in range(60):
        middle = 0.5 * (low + high)
        acid = np.exp(middle)
        above = np.maximum(verhoff_banchero_1974(water, acid), okkes_1987(water, acid)) > target
        high, low = np.where(above, middle, high), np.where(above, low, middle)
    return np.asarray(np.exp(low))


def frost_margin_k(surface_temperature_k: Values, dew_point_k: Values) -> Array:
    """Distance of a cooling surface from frost.

    Parameters
    ----------
    surface_temperature_k : array_like
        Coldest surface the air touches [K].
    dew_point_k : array_like
        Dew point (frost point) of the air [K].

    Returns
    -------
    Array
        Temperature margin [K]: negative where the surface lies below both the ice point and the dew point.
    """
    surface = np.asarray(surface_temperature_k, dtype=np.float64)
    return np.asarray(surface - np.minimum(ICE_POINT_K, dew_point_k))


_ACID_CAUTION = (
    "Acid condensate and the water that washes deposits off burn skin and eyes; wash water turns dry "
    "deposits back into acid."
)

ACID = Criterion(
    slug="acid-dew-point-margin",
    check="acid-dew-point",
    quantity="coldest metal less acid dew point",
    unit="K",
    sense="at-least",
    beyond=0.0,
    near=10.0,
    source="margin over the dew point in boiler practice",
    trust="own",
    needs=("sulfur trioxide, or sulfur dioxide and its share", "water", "metal temperature"),
    caution=_ACID_CAUTION,
)
WATER = Criterion(
    slug="water-dew-point-margin",
    check="water-dew-point",
    quantity="coldest metal less water dew point",
    unit="K",
    sense="at-least",
    beyond=0.0,
    near=5.0,
    source="margin over the dew point in boiler practice",
    trust="own",
    needs=("water", "metal temperature"),
)
SALT_WETTED = Criterion(
    slug="salt-wetted-margin",
    check="water-dew-point",
    quantity="coldest metal less water dew point, ash of straw, wood, black liquor or refuse",
    unit="K",
    sense="at-least",
    beyond=0.0,
    near=30.0,
    source="hygroscopic salts wet metal above the water dew point; the 30 K are this service's rule",
    trust="own",
    needs=("water", "metal temperature", "fuel"),
)
FROST = Criterion(
    slug="frost-margin",
    check="outside-frost",
    quantity="surface less the lower of ice point and dew point",
    unit="K",
    sense="at-least",
    beyond=0.0,
    near=2.0,
    source="ice point and dew point; the 2 K are this service's rule",
    trust="own",
    needs=("humidity", "metal temperature"),
)
CRITERIA = (ACID, WATER, SALT_WETTED, FROST)
