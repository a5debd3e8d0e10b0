"""Fluids and metals as arrays of properties, case axis first.

==================  ==========================================================================================
module              what it holds
==================  ==========================================================================================
``medium``          what the engine asks of a fluid: the ``Medium`` protocol and ``State``
``moist_air``       ``MoistAir``: humid air of given humidity ratio
``psychrometrics``  humidity ratio from relative humidity, wet bulb or dew point, and back; standard atmosphere
``gas_mixture``     ``GasMixture``: flue gas or any low-density mixture; ``GASES`` names its columns
``real_gas``        how far a mixture is from the ideal gas it is taken for
``combustion``      flue gas of a fuel; water and acid dew points
``fuels``           typical fuels
``pure``            ``PureSinglePhase``: a pure liquid or gas; ``phase_at`` tells which
``saturation``      ``Saturation``: saturated liquid and vapour for condensing
``solution``        ``Solution``: glycols, alcohols, salts in water; freezing temperature
``table``           ``Table``: a caller's own points
``local``           ``LocalMedium``: another medium as polynomials over the range of one rating
``materials``       metals; ``conductivity`` curves
``catalogue``       ``fluid_records``: what is on offer, limits, sources, errors
==================  ==========================================================================================

Tables are built once, when a fluid is first used; nothing is asked of an equation of state per cell.
"""

from crossbank_service.properties._arrays import Curve
from crossbank_service.properties._fluids import FLUIDS
from crossbank_service.properties._gas_data import R as GAS_CONSTANT
from crossbank_service.properties._gas_data import Species, gas_records
from crossbank_service.properties._limits import PureLimits, pure_limits
from crossbank_service.properties.catalogue import FluidRecord, fluid_records, mixture_records
from crossbank_service.properties.combustion import (
    CombustionProducts,
    acid_dew_point,
    combustion_products,
    water_dew_point,
)
from crossbank_service.properties.fuels import FUELS, Fuel, fuel_records
from crossbank_service.properties.gas_mixture import GASES, MOLAR_MASSES_KG_MOL, GasMixture
from crossbank_service.properties.local import LocalMedium
from crossbank_service.properties.materials import (
    MATERIALS,
    Material,
    conductivity,
    material,
    material_records,
)
from crossbank_service.properties.medium import Array, Medium, State
from crossbank_service.properties.moist_air import MoistAir
from crossbank_service.properties.psychrometrics import (
    dew_point,
    humidity_ratio_from_dew_point,
    humidity_ratio_from_relative_humidity,
    humidity_ratio_from_vapour_pressure,
    humidity_ratio_from_wet_bulb,
    relative_humidity,
    saturation_pressure,
    saturation_temperature,
    standard_pressure,
    vapour_pressure,
    wet_bulb,
)
from crossbank_service.properties.pure import Phase, PureSinglePhase, phase_at
from crossbank_service.properties.real_gas import compressibility
from crossbank_service.properties.saturation import SaturatedState, Saturation
from crossbank_service.properties.solution import (
    SOLUTIONS,
    Solution,
    SolutionLimits,
    freezing_temperature,
    solution_limits,
)
from crossbank_service.properties.table import Table, TablePoints

__all__ = [
    "FLUIDS",
    "FUELS",
    "GASES",
    "GAS_CONSTANT",
    "MATERIALS",
    "MOLAR_MASSES_KG_MOL",
    "SOLUTIONS",
    "Array",
    "CombustionProducts",
    "Curve",
    "FluidRecord",
    "Fuel",
    "GasMixture",
    "LocalMedium",
    "Material",
    "Medium",
    "MoistAir",
    "Phase",
    "PureLimits",
    "PureSinglePhase",
    "SaturatedState",
    "Saturation",
    "Solution",
    "SolutionLimits",
    "Species",
    "State",
    "Table",
    "TablePoints",
    "acid_dew_point",
    "combustion_products",
    "compressibility",
    "conductivity",
    "dew_point",
    "fluid_records",
    "freezing_temperature",
    "fuel_records",
    "gas_records",
    "humidity_ratio_from_dew_point",
    "humidity_ratio_from_relative_humidity",
    "humidity_ratio_from_vapour_pressure",
    "humidity_ratio_from_wet_bulb",
    "material",
    "material_records",
    "mixture_records",
    "phase_at",
    "pure_limits",
    "relative_humidity",
    "saturation_pressure",
    "saturation_temperature",
    "solution_limits",
    "standard_pressure",
    "vapour_pressure",
    "water_dew_point",
    "wet_bulb",
]
