"""What the vapours of a gas are: water and its dew point, acid formers, gases that radiate."""

from dataclasses import dataclass

import numpy as np

from crossbank_service import properties
from crossbank_service.properties import GASES, MOLAR_MASSES_KG_MOL, psychrometrics
from crossbank_service.properties.moist_air import DRY_MOLAR_MASS_KG_MOL, MASS_RATIO
from crossbank_service.properties.moist_air import TEMPERATURE_LIMITS_K as MOIST_AIR_LIMITS_K
from crossbank_service.rating._case import FluidInput

LEAST_DRY_MOLE_FRACTION = 0.11
"""With less dry gas (in air a humidity ratio of 5) a gas is steam: it has no humidity ratio and is not computed wet."""


@dataclass(frozen=True)
class Composition:
    """The parts of a gas that condense, corrode or radiate, as mole fractions.

    Attributes
    ----------
    water, sulfur_dioxide, carbon_dioxide : float
        Mole fractions in the gas as it is.
    dry_molar_mass : float
        Of the gas without its water [kg/mol]; of water where there is nothing else.
    molar_ratio : float
        Molar mass of water over that of the dry gas.
    humidity_ratio : float or None
        kg of water a kg of dry gas; None for steam.
    """

    water: float
    sulfur_dioxide: float
    carbon_dioxide: float
    dry_molar_mass: float
    molar_ratio: float
    humidity_ratio: float | None

    def saturates(self, temperature: float, pressure: float) -> bool:
        """Whether a surface at a temperature [K] is below the dew point; cheaper than the dew point itself."""
        vapour = self.water * pressure
        return vapour > 0.0 and float(psychrometrics.saturation_pressure(temperature)) < vapour

    def dew_point(self, pressure: float) -> float:
        """Water dew point, frost point below 273.16 K [K]."""
        return float(psychrometrics.saturation_temperature(self.water * pressure))


def composition_of(fluid: FluidInput) -> Composition | None:
    """The composition of moist air or a gas mixture; None for every other fluid."""
    match fluid.family[0]:
        case "moist-air":
            humidity = fluid.numbers[0]
            assert isinstance(humidity, float)
            water = humidity / (humidity + MASS_RATIO)
            # the carbon dioxide of air counts for nothing here
            return Composition(water, 0.0, 0.0, DRY_MOLAR_MASS_KG_MOL, MASS_RATIO, humidity)
        case "gas-mixture":
            y = dict(zip(GASES, (float(n) for n in fluid.numbers), strict=True))  # type: ignore[arg-type]
            water, of_water = y["water"], MOLAR_MASSES_KG_MOL["water"]
            dry = 1.0 - water
            mass = sum(y[name] * m for name, m in MOLAR_MASSES_KG_MOL.items() if name != "water")
            dry_mass = mass / dry if dry > 1e-9 else of_water
            ratio = of_water / dry_mass
            humidity_ratio = None if dry < LEAST_DRY_MOLE_FRACTION else ratio * water / dry
            return Composition(
                water, y["sulfur_dioxide"], y["carbon_dioxide"], dry_mass, ratio, humidity_ratio
            )
    return None


def gas_limits(fluid: FluidInput) -> tuple[float, float]:
    """Temperatures between which the properties of moist air or a gas mixture are known [K]."""
    if fluid.family[0] == "moist-air":
        return MOIST_AIR_LIMITS_K
    low, high = properties.GasMixture(np.array([fluid.numbers])).temperature_limits_k
    return float(low[0]), float(high[0])
