"""Published laws of the acid dew point: one function and one record each."""

from collections.abc import Callable
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from crossbank_service.methods.criterion import Trust, Values
from crossbank_service.methods.record import Array

MMHG_PA = 133.322
ATMOSPHERE_PA = 101325.0
ICE_POINT_K = 273.15

# The laws are logarithms of partial pressures: clamped here they stay finite and keep their sign of slope.
LEAST_PA = 1e-6
MOST_ACID_PA = 1e5
MOST_WATER_PA = 1e6


@dataclass(frozen=True, kw_only=True)
class DewPointLaw:
    """One published dew point law.

    Attributes
    ----------
    slug : str
        Authors and year.
    acid : str
        ``sulfuric``, ``hydrochloric``, ``hydrobromic`` or ``nitric``.
    function : callable
        ``(water_pressure_pa, acid_pressure_pa) -> dew point in kelvin``.
    source, trust, doubt : str
        Where it is from, how far that was checked, what is doubtful.
    water_mole_fraction, acid_mole_fraction : tuple of float
        Range near atmospheric pressure, least and most.
    standard_uncertainty_k : float
        Scatter of plant readings about any of the laws, one standard deviation.
    """

    slug: str
    acid: str
    function: Callable[[Values, Values], Array]
    source: str
    trust: Trust
    doubt: str | None = None
    water_mole_fraction: tuple[float, float] = (0.03, 0.25)
    acid_mole_fraction: tuple[float, float] = (0.5e-6, 100e-6)
    standard_uncertainty_k: float = 3.5

    def in_range(self, water_mole_fraction: Values, acid_mole_fraction: Values) -> NDArray[np.bool_]:
        """Whether each composition lies in the law's range (booleans, broadcast)."""
        water = np.asarray(water_mole_fraction, dtype=np.float64)
        acid = np.asarray(acid_mole_fraction, dtype=np.float64)
        return np.asarray(
            (water >= self.water_mole_fraction[0])
            & (water <= self.water_mole_fraction[1])
            & (acid >= self.acid_mole_fraction[0])
            & (acid <= self.acid_mole_fraction[1])
        )


def _pressures(water_pressure_pa: Values, acid_pressure_pa: Values) -> tuple[Array, Array]:
    water = np.clip(np.asarray(water_pressure_pa, dtype=np.float64), LEAST_PA, MOST_WATER_PA)
    acid = np.clip(np.asarray(acid_pressure_pa, dtype=np.float64), LEAST_PA, MOST_ACID_PA)
    return water, acid


def verhoff_banchero_1974(water_pressure_pa: Values, acid_pressure_pa: Values) -> Array:
    """Sulfuric acid dew point after Verhoff and Banchero.

    Parameters
    ----------
    water_pressure_pa, acid_pressure_pa : array_like
        Partial pressures of water and of sulfuric acid counted as sulfur trioxide [Pa].

    Returns
    -------
    Array
        Dew point [K].

    Notes
    -----
    1000/T = 2.276 - 0.0294 ln pW - 0.0858 ln pS + 0.0062 ln pW ln pS, pressures in mmHg. Verhoff & Banchero,
    Chem. Eng. Prog. 70 (1974) 71. The form in atmospheres and decadic logarithms agrees to 0.04 K over the
    range, which settles the cross term (0.0082 in some prints is a slip).
    """
    water, acid = _pressures(water_pressure_pa, acid_pressure_pa)
    ln_w, ln_s = np.log(water / MMHG_PA), np.log(acid / MMHG_PA)
    return np.asarray(1000.0 / (2.276 - 0.0294 * ln_w - 0.0858 * ln_s + 0.0062 * ln_w * ln_s))


def okkes_1987(water_pressure_pa: Values, acid_pressure_pa: Values) -> Array:
    """Sulfuric acid dew point after Okkes.

    Parameters
    ----------
    water_pressure_pa, acid_pressure_pa : array_like
        Partial pressures of water and of sulfuric acid counted as sulfur trioxide [Pa].

    Returns
    -------
    Array
        Dew point [K].

    Notes
    -----
    t/C = 203.25 + 27.6 lg pW + 10.83 lg pS + 1.06 (lg pS + 8)^2.19, pressures in atm. Okkes, Hydrocarbon
    Process. 66 (1987) 53. The last term is dropped below 1e-8 atm, where the power has no meaning.
    """
    water, acid = _pressures(water_pressure_pa, acid_pressure_pa)
    lg_w, lg_s = np.log10(water / ATMOSPHERE_PA), np.log10(acid / ATMOSPHERE_PA)
    curve = np.maximum(lg_s + 8.0, 0.0) ** 2.19
    return np.asarray(203.25 + 27.6 * lg_w + 10.83 * lg_s + 1.06 * curve + ICE_POINT_K)


def zarenezhad_2009(water_pressure_pa: Values, acid_pressure_pa: Values) -> Array:
    """Sulfuric acid dew point after ZareNezhad.

    Parameters
    ----------
    water_pressure_pa, acid_pressure_pa : array_like
        Partial pressures of water and of sulfuric acid counted as sulfur trioxide [Pa].

    Returns
    -------
    Array
        Dew point [K].

    Notes
    -----
    t/C = 150 + 11.664 ln pS + 8.1328 ln pW - 0.383226 ln pW ln pS, pressures in mmHg. ZareNezhad, Oil Gas J.
    (2009).
    """
    water, acid = _pressures(water_pressure_pa, acid_pressure_pa)
    ln_w, ln_s = np.log(water / MMHG_PA), np.log(acid / MMHG_PA)
    return np.asarray(150.0 + 11.664 * ln_s + 8.1328 * ln_w - 0.383226 * ln_w * ln_s + ICE_POINT_K)


def haase_borgmann_1981(water_pressure_pa: Values, acid_pressure_pa: Values) -> Array:
    """Sulfuric acid dew point after Haase and Borgmann.

    Parameters
    ----------
    water_pressure_pa, acid_pressure_pa : array_like
        Partial pressures of water and of sulfuric acid counted as sulfur trioxide [Pa].

    Returns
    -------
    Array
        Dew point [K].

    Notes
    -----
    t/C = 255 + 27.6 lg pW + 18.7 lg pS, pressures in atm. Haase & Borgmann 1981, from memory.
    """
    water, acid = _pressures(water_pressure_pa, acid_pressure_pa)
    return np.asarray(
        255.0 + 27.6 * np.log10(water / ATMOSPHERE_PA) + 18.7 * np.log10(acid / ATMOSPHERE_PA) + ICE_POINT_K
    )


def _kiang(
    water_pressure_pa: Values, acid_pressure_pa: Values, a: float, b: float, c: float, d: float
) -> Array:
    # one form for the three: 1000/T = a - b ln pW - c ln pA + d ln pW ln pA, mmHg
    water, acid = _pressures(water_pressure_pa, acid_pressure_pa)
    ln_w, ln_a = np.log(water / MMHG_PA), np.log(acid / MMHG_PA)
    return np.asarray(1000.0 / (a - b * ln_w - c * ln_a + d * ln_w * ln_a))


def kiang_1981_hydrochloric(water_pressure_pa: Values, acid_pressure_pa: Values) -> Array:
    """Hydrochloric acid dew point after Kiang.

    Parameters
    ----------
    water_pressure_pa, acid_pressure_pa : array_like
        Partial pressures of water and hydrogen chloride [Pa].

    Returns
    -------
    Array
        Dew point [K].

    Notes
    -----
    1000/T = 3.7368 - 0.1591 ln pW - 0.0326 ln pA + 0.00269 ln pW ln pA, mmHg. Kiang, Chem. Eng. 88 (1981)
    127.
    """
    return _kiang(water_pressure_pa, acid_pressure_pa, 3.7368, 0.1591, 0.0326, 0.00269)


def kiang_1981_hydrobromic(water_pressure_pa: Values, acid_pressure_pa: Values) -> Array:
    """Hydrobromic acid dew point after Kiang.

    Parameters
    ----------
    water_pressure_pa, acid_pressure_pa : array_like
        Partial pressures of water and hydrogen bromide [Pa].

    Returns
    -------
    Array
        Dew point [K].

    Notes
    -----
    1000/T = 3.5639 - 0.1350 ln pW - 0.0398 ln pA + 0.00235 ln pW ln pA, mmHg. Kiang, Chem. Eng. 88 (1981)
    127, from memory; 0.0396 is also printed (0.1 K).
    """
    return _kiang(water_pressure_pa, acid_pressure_pa, 3.5639, 0.1350, 0.0398, 0.00235)


def kiang_1981_nitric(water_pressure_pa: Values, acid_pressure_pa: Values) -> Array:
    """Nitric acid dew point after Kiang, first constant 3.6614.

    Parameters
    ----------
    water_pressure_pa, acid_pressure_pa : array_like
        Partial pressures of water and nitric acid [Pa].

    Returns
    -------
    Array
        Dew point [K].

    Notes
    -----
    1000/T = 3.6614 - 0.1446 ln pW - 0.0827 ln pA + 0.00756 ln pW ln pA, mmHg. Kiang, Chem. Eng. 88 (1981)
    127. The constant 3.8614 in some prints puts the acid dew point below that of the water, which is
    impossible. Low by about 1, 3, 5 and 8 K at 1000, 500, 200 and 100 ppm: see
    `dew_points.nitric_dew_point_k`.
    """
    return _kiang(water_pressure_pa, acid_pressure_pa, 3.6614, 0.1446, 0.0827, 0.00756)


LAWS = (
    DewPointLaw(
        slug="verhoff-banchero-1974",
        acid="sulfuric",
        function=verhoff_banchero_1974,
        source="Verhoff & Banchero, Chem. Eng. Prog. 70 (1974) 71",
        trust="confirmed",
    ),
    DewPointLaw(
        slug="okkes-1987",
        acid="sulfuric",
        function=okkes_1987,
        source="Okkes, Hydrocarbon Process. 66 (1987) 53",
        trust="confirmed",
    ),
    DewPointLaw(
        slug="zarenezhad-2009",
        acid="sulfuric",
        function=zarenezhad_2009,
        source="ZareNezhad, Oil Gas J. (2009)",
        trust="confirmed",
    ),
    DewPointLaw(
        slug="haase-borgmann-1981",
        acid="sulfuric",
        function=haase_borgmann_1981,
        source="Haase & Borgmann 1981",
        trust="consistent",
    ),
    DewPointLaw(
        slug="kiang-1981-hydrochloric",
        acid="hydrochloric",
        function=kiang_1981_hydrochloric,
        source="Kiang, Chem. Eng. 88 (1981) 127",
        trust="confirmed",
        acid_mole_fraction=(1e-6, 1000e-6),
    ),
    DewPointLaw(
        slug="kiang-1981-hydrobromic",
        acid="hydrobromic",
        function=kiang_1981_hydrobromic,
        source="Kiang, Chem. Eng. 88 (1981) 127",
        trust="consistent",
        doubt="a third coefficient of 0.0396 is also printed; it moves the dew point by 0.1 K",
        acid_mole_fraction=(1e-6, 1000e-6),
    ),
    DewPointLaw(
        slug="kiang-1981-nitric",
        acid="nitric",
        function=kiang_1981_nitric,
        source="Kiang, Chem. Eng. 88 (1981) 127",
        trust="derived",
        doubt="printed with 3.8614 for 3.6614; reads low below 500 ppm",
        acid_mole_fraction=(300e-6, 1000e-6),
    ),
)
