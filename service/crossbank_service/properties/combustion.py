"""Combustion products of a fuel given by mass fractions, and the dew points of flue gas."""

from dataclasses import dataclass

import numpy as np
from numpy.typing import ArrayLike

from crossbank_service.properties.gas_mixture import GasMixture
from crossbank_service.properties.medium import Array
from crossbank_service.properties.psychrometrics import saturation_temperature

_AIR = {"nitrogen": 0.78084, "oxygen": 0.20946, "argon": 0.00934, "carbon_dioxide": 0.00036}
_AIR_MOLAR_MASS = 28.9647  # kg/kmol
_WATER_MOLAR_MASS = 18.015
_MMHG = 133.322


@dataclass(frozen=True, slots=True)
class CombustionProducts:
    """What leaves complete combustion, per case; arrays of shape (N,).

    Attributes
    ----------
    mole_fractions : dict of str to Array
        Wet flue gas: ``nitrogen``, ``oxygen``, ``carbon_dioxide``, ``water``, ``argon``, ``sulfur_dioxide``
        [-].
    molar_mass_kg_mol : Array
        Of the wet flue gas.
    excess_air : Array
        Air above the stoichiometric, as a fraction of it.
    stoichiometric_air_kg_kg : Array
        kg of dry air a kg of fuel.
    flue_gas_kg_kg : Array
        kg of wet flue gas a kg of fuel.
    """

    mole_fractions: dict[str, Array]
    molar_mass_kg_mol: Array
    excess_air: Array
    stoichiometric_air_kg_kg: Array
    flue_gas_kg_kg: Array

    def mixture(self) -> GasMixture:
        """Make a medium of the flue gas."""
        return GasMixture.of(self.mole_fractions)


def combustion_products(
    *,
    carbon: ArrayLike,
    hydrogen: ArrayLike = 0.0,
    sulfur: ArrayLike = 0.0,
    oxygen: ArrayLike = 0.0,
    nitrogen: ArrayLike = 0.0,
    water: ArrayLike = 0.0,
    excess_air: ArrayLike | None = None,
    dry_oxygen_mole_fraction: ArrayLike | None = None,
    air_humidity_ratio: ArrayLike = 0.0,
) -> CombustionProducts:
    """Flue gas of complete combustion in air.

    Parameters
    ----------
    carbon, hydrogen, sulfur, oxygen, nitrogen, water : array_like
        Mass fractions of the fuel as fired [-], shape (N,); what is missing to 1 is ash.
    excess_air : array_like or None
        Air above the stoichiometric, as a fraction of it [-].
    dry_oxygen_mole_fraction : array_like or None
        Oxygen in the dried flue gas [-]; given in place of ``excess_air``.
    air_humidity_ratio : array_like
        kg of vapour a kg of dry combustion air [-].

    Returns
    -------
    CombustionProducts

    Raises
    ------
    ValueError
        Unless exactly one of ``excess_air`` and ``dry_oxygen_mole_fraction`` is given.

    Notes
    -----
    Element balances a kg of fuel: O2 need = c/12.011 + h/4.032 + s/32.06 - o/31.998 kmol; dry air of
    0.78084 N2, 0.20946 O2, 0.00934 Ar, 0.00036 CO2. No CO, SO3 or NOx. From dry oxygen y: e = y (V/L) /
    (0.20946 - y) with the stoichiometric dry flue gas V and air L.
    """
    if (excess_air is None) == (dry_oxygen_mole_fraction is None):
        raise ValueError("give either excess_air or dry_oxygen_mole_fraction")
    given = (carbon, hydrogen, sulfur, oxygen, nitrogen, water, air_humidity_ratio)
    level = excess_air if excess_air is not None else dry_oxygen_mole_fraction
    arrays = np.broadcast_arrays(*(np.atleast_1d(np.asarray(v, dtype=np.float64)) for v in (*given, level)))
    c, h, s, o, n, w, humidity, level_array = arrays
    need = c / 12.011 + h / 4.032 + s / 32.06 - o / 31.998
    stoichiometric = need / _AIR["oxygen"]  # kmol of dry air a kg of fuel
    if excess_air is None:
        dry = c / 12.011 + s / 32.06 + n / 28.0134 + stoichiometric - need
        room = np.maximum(_AIR["oxygen"] - level_array, 1e-6)
        excess = level_array * dry / (stoichiometric * room)
    else:
        excess = level_array
    air = stoichiometric * (1.0 + excess)
    vapour = humidity * air * _AIR_MOLAR_MASS / _WATER_MOLAR_MASS
    moles = {
        "nitrogen": n / 28.0134 + _AIR["nitrogen"] * air,
        "oxygen": _AIR["oxygen"] * air - need,
        "carbon_dioxide": c / 12.011 + _AIR["carbon_dioxide"] * air,
        "water": h / 2.016 + w / _WATER_MOLAR_MASS + vapour,
        "argon": _AIR["argon"] * air,
        "sulfur_dioxide": s / 32.06,
    }
    total = np.zeros_like(c)
    for amount in moles.values():
        total = total + amount
    fractions = {name: np.asarray(amount / total) for name, amount in moles.items()}
    molar_mass = GasMixture.of(fractions).molar_mass_kg_mol
    return CombustionProducts(
        mole_fractions=fractions,
        molar_mass_kg_mol=molar_mass,
        excess_air=np.asarray(excess),
        stoichiometric_air_kg_kg=np.asarray(stoichiometric * _AIR_MOLAR_MASS),
        flue_gas_kg_kg=np.asarray(total * molar_mass * 1e3),
    )


def water_dew_point(water_mole_fraction: ArrayLike, pressure_pa: ArrayLike) -> Array:
    """Water dew point of a gas [K], the saturation temperature at the vapour's partial pressure."""
    y = np.asarray(water_mole_fraction, dtype=np.float64)
    return saturation_temperature(y * np.asarray(pressure_pa, dtype=np.float64))


def acid_dew_point(
    water_mole_fraction: ArrayLike, sulfur_trioxide_mole_fraction: ArrayLike, pressure_pa: ArrayLike
) -> Array:
    """Sulfuric-acid dew point of flue gas.

    Parameters
    ----------
    water_mole_fraction, sulfur_trioxide_mole_fraction, pressure_pa : array_like
        [-], [-] (all sulfuric acid counted as SO3), [Pa]

    Returns
    -------
    Array
        [K]; never below the water dew point, which is also what gas without SO3 gets.

    Notes
    -----
    Verhoff and Banchero, Chem. Eng. Prog. 70 (1974) 71: 1000/T = 2.276 - 0.0294 ln p_w - 0.0858 ln p_s
    + 0.0062 ln p_w ln p_s, pressures in mmHg. For 0.5-100 ppm SO3 and 3-25 % water near 1 atm; other
    published relations differ by up to 4 K and plant readings scatter by 7 K.
    """
    p = np.asarray(pressure_pa, dtype=np.float64) / _MMHG
    y_w = np.asarray(water_mole_fraction, dtype=np.float64)
    y_s = np.asarray(sulfur_trioxide_mole_fraction, dtype=np.float64)
    log_w, log_s = np.log(np.maximum(y_w * p, 1e-6)), np.log(np.maximum(y_s * p, 1e-12))
    inverse = 2.276 - 0.0294 * log_w - 0.0858 * log_s + 0.0062 * log_w * log_s
    acid = np.where((y_s > 0.0) & (inverse > 1.0), 1e3 / np.maximum(inverse, 1.0), 0.0)
    return np.maximum(acid, water_dew_point(y_w, pressure_pa))
