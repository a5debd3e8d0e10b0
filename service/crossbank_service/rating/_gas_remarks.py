"""Notices about outside gases: what condenses or corrodes, radiation and buoyancy left out, dense gas."""

from crossbank.contract import Notice
from crossbank_service.methods.dew_points import sulfur_trioxide_mole_fraction, sulfuric_dew_points
from crossbank_service.properties.real_gas import NOTABLE_DEVIATION
from crossbank_service.rating._case import Case, FluidInput
from crossbank_service.rating._composition import composition_of
from crossbank_service.rating._gas_door import SULFUR_TRIOXIDE_SHARE, departure
from crossbank_service.rating._performance import InsideFound, Performance
from crossbank_service.rating._report import one
from crossbank_service.rating.notices import notice

BUOYANT = 0.3
"""Gr/Re^2 from which the forced-convection correlations are outside their data."""
RADIATING_K = 700.0
RADIATING_MOLE_FRACTION = 0.005
"""Water vapour and carbon dioxide together, below which a gas radiates next to nothing."""


def gas_remarks(case: Case, found: Performance) -> list[Notice]:
    """Notices of the outside stream that its composition and its flow call for."""
    return [
        *_water_remarks(case, found),
        *_acid_remarks(case, found),
        *_radiation_remarks(case, found),
        *_buoyancy_remarks(found),
        *density_remarks(
            case.outside_fluid,
            min(one(found.outside.bulk_min), one(found.outside.face_min)),
            case.outside_pressure,
            "/outside/fluid",
        ),
    ]


def _water_remarks(case: Case, found: Performance) -> list[Notice]:
    gas = composition_of(case.outside_fluid)
    if gas is None or found.wet is not None:
        return []
    coldest = one(found.outside.face_min)
    if not gas.saturates(coldest, case.outside_pressure):
        return []
    dew = gas.dew_point(case.outside_pressure)
    return [
        notice(
            "surface-below-dew-point",
            f"The outer surface reaches {coldest:.2f} K, below the dew point {dew:.2f} K of the outside stream; the "
            "surface was computed dry, its latent heat and condensate are left out.",
            "/outside/fluid",
        )
    ]


def _acid_remarks(case: Case, found: Performance) -> list[Notice]:
    water, dioxide = case.water_mole_fraction, case.sulfur_dioxide_mole_fraction
    gas = composition_of(case.outside_fluid)
    if gas is None or not water or not dioxide:
        return []
    acid = float(sulfur_trioxide_mole_fraction(dioxide, SULFUR_TRIOXIDE_SHARE)) * case.outside_pressure
    points = sulfuric_dew_points(gas.dew_point(case.outside_pressure), water * case.outside_pressure, acid)
    dew, coldest = float(points.governing_k), one(found.wall.lowest)
    if not bool(points.acid_governs) or coldest >= dew:
        return []
    return [
        notice(
            "surface-below-acid-dew-point",
            f"The tube metal reaches {coldest:.2f} K, below the sulfuric acid dew point of about {dew:.0f} K (sulfur "
            f"trioxide taken as {SULFUR_TRIOXIDE_SHARE:.0%} of the {dioxide * 1e6:.3g} ppm of sulfur dioxide; "
            f"published laws differ by {float(points.spread_k):.0f} K): it will corrode. Acid deposits "
            "and their wash water burn skin and eyes.",
            "/outside/fluid",
        )
    ]


def _radiation_remarks(case: Case, found: Performance) -> list[Notice]:
    hottest = one(found.outside.bulk_max)
    share = _radiating(case.outside_fluid)
    if hottest <= RADIATING_K or share < RADIATING_MOLE_FRACTION:
        return []
    return [
        notice(
            "gas-radiation-ignored",
            f"The gas reaches {hottest:.0f} K and holds a mole fraction of {share:.3g} of water vapour and carbon "
            "dioxide: its radiation to the tubes, and any seen from a furnace, is left out. More heat passes than "
            "stated, and a heated tube's first rows run hotter.",
            "/outside/fluid",
        )
    ]


def _radiating(fluid: FluidInput) -> float:
    """Water vapour and carbon dioxide of a gas, as a mole fraction."""
    gas = composition_of(fluid)
    if gas is not None:
        return gas.water + gas.carbon_dioxide
    return 1.0 if fluid.gas and fluid.family[:2] in {("pure", "water"), ("pure", "carbon-dioxide")} else 0.0


def _buoyancy_remarks(found: Performance) -> list[Notice]:
    ratio = one(found.outside.richardson)
    if ratio <= BUOYANT:
        return []
    return [
        notice(
            "buoyancy",
            f"Gr/Re² reaches {ratio:.3g} in a row (forced convection: below {BUOYANT:g}): the stream is so slow that "
            "its own buoyancy moves it too. Coefficient, spread over the face and pressure drop may be well off.",
            "/outside/flow",
        )
    ]


def density_remarks(fluid: FluidInput, coldest: float, pressure: float, pointer: str) -> list[Notice]:
    """Whether a gas mixture is notably denser or lighter than the ideal gas it was rated as."""
    if fluid.family[0] != "gas-mixture":
        return []
    off = departure(fluid, coldest, pressure)
    if off <= NOTABLE_DEVIATION:
        return []
    return [
        notice(
            "gas-not-ideal",
            f"At {pressure:.4g} Pa and {coldest:.1f} K the mixture is some {off:.1%} off the ideal gas it was rated as "
            "(an estimate).",
            pointer,
        )
    ]


def inside_gas_remarks(fluid: FluidInput, found: InsideFound) -> list[Notice]:
    """Vapour in a gas inside the tubes that meets a wall below its dew point, and dense gas."""
    gas = composition_of(fluid)
    if gas is None:
        return []
    pointer, coldest = "/inside/fluid", min(one(found.face_min), one(found.bulk_min))
    highest = one(found.outlet_pressure) + max(one(found.drop), 0.0)
    out = density_remarks(fluid, coldest, highest, pointer)
    if gas.saturates(coldest, highest):
        dew = gas.dew_point(highest)
        out.append(
            notice(
                "gas-condenses",
                f"The gas inside holds water vapour with a dew point of {dew:.2f} K and meets {coldest:.2f} K in its "
                "bulk or at the wall; it was computed as a gas that stays dry.",
                pointer,
            )
        )
    return out
