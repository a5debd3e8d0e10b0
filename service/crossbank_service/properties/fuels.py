"""Typical fuels: compositions to start from where no analysis is at hand."""

from collections.abc import Mapping
from dataclasses import dataclass
from types import MappingProxyType

MEMBERS = ("carbon", "hydrogen", "sulfur", "oxygen", "nitrogen", "water", "ash")
"""Names of the mass fractions of a fuel as fired."""


@dataclass(frozen=True, slots=True, kw_only=True)
class Fuel:
    """One typical fuel.

    Attributes
    ----------
    slug, description : str
        Name, and what it is.
    as_fired : mapping
        Mass fractions by ``MEMBERS``, adding to 1.
    source, doubt : str
        Where the composition is from, and how far real fuels of the name stray.
    """

    slug: str
    description: str
    as_fired: Mapping[str, float]
    source: str
    doubt: str


def _wet(dry: Mapping[str, float], water: float) -> dict[str, float]:
    """A fuel as fired from its analysis on the dry basis."""
    return {**{name: round(share * (1.0 - water), 5) for name, share in dry.items()}, "water": water}


def _gas(moles: Mapping[str, float]) -> dict[str, float]:
    """Element mass fractions of a fuel gas from its mole fractions."""
    total = dict.fromkeys(MEMBERS, 0.0)
    for gas, y in moles.items():
        for name, mass in _ELEMENTS[gas].items():
            total[name] += y * mass
    mass = sum(total.values())
    return {name: round(part / mass, 5) for name, part in total.items()}


_C, _H2, _N2, _O2 = 12.011, 2.016, 28.0134, 31.998
_ELEMENTS = {
    "methane": {"carbon": _C, "hydrogen": 2 * _H2},
    "ethane": {"carbon": 2 * _C, "hydrogen": 3 * _H2},
    "propane": {"carbon": 3 * _C, "hydrogen": 4 * _H2},
    "n-butane": {"carbon": 4 * _C, "hydrogen": 5 * _H2},
    "nitrogen": {"nitrogen": _N2},
    "carbon-dioxide": {"carbon": _C, "oxygen": _O2},
}


def _fuel(slug: str, description: str, parts: Mapping[str, float], *, source: str, doubt: str) -> Fuel:
    whole = {name: parts.get(name, 0.0) for name in MEMBERS}
    # what rounding leaves goes to carbon, so that the fractions add to 1
    whole["carbon"] = round(whole["carbon"] + 1.0 - sum(whole.values()), 6)
    return Fuel(
        slug=slug, description=description, as_fired=MappingProxyType(whole), source=source, doubt=doubt
    )


_MEMORY = "common practice, from memory; no single source"
# Fir mill waste of the report named below, its dry analysis scaled to add to 1
_SOFTWOOD = {
    "carbon": 0.5123,
    "hydrogen": 0.0598,
    "oxygen": 0.4229,
    "nitrogen": 0.0006,
    "sulfur": 0.0003,
    "ash": 0.0041,
}
_SOFTWOOD_SOURCE = (
    "dry analysis of fir mill waste in Miles, Baxter, Bryers, Jenkins and Oden, Alkali Deposits Found in Biomass Power "
    "Plants, NREL/TP-433-8142 (1995)"
)
_BARK = {
    "carbon": 0.520,
    "hydrogen": 0.059,
    "oxygen": 0.385,
    "nitrogen": 0.005,
    "sulfur": 0.0003,
    "ash": 0.0307,
}
_WOOD_DOUBT = (
    "Water decides and changes by the load: measure it. Dry carbon runs from 0.47 to 0.54, ash from 0.002 to 0.01 "
    "(more with sand)."
)

_FUELS = (
    _fuel(
        "natural-gas",
        "pipeline natural gas, rich in methane",
        _gas(
            {
                "methane": 0.95,
                "ethane": 0.025,
                "propane": 0.005,
                "n-butane": 0.002,
                "nitrogen": 0.010,
                "carbon-dioxide": 0.008,
            }
        ),
        source="mole fractions 0.95 methane, 0.025 ethane, 0.005 propane, 0.002 butane, 0.010 nitrogen, 0.008 carbon "
        f"dioxide: {_MEMORY}",
        doubt="Nitrogen runs up to 0.14 by mole in some networks; ask the supplier.",
    ),
    _fuel(
        "propane",
        "liquefied petroleum gas as pure propane",
        _gas({"propane": 1.0}),
        source="the formula C3H8",
        doubt="Commercial propane holds some butane and propylene; the flue gas hardly changes.",
    ),
    _fuel(
        "light-fuel-oil",
        "distillate heating oil, low in sulfur",
        {"carbon": 0.865, "hydrogen": 0.133, "sulfur": 0.001, "oxygen": 0.0008, "nitrogen": 0.0002},
        source=_MEMORY,
        doubt="Sulfur runs from 0.00001 to 0.001 by the grade sold; it decides the acid dew point.",
    ),
    _fuel(
        "heavy-fuel-oil",
        "residual fuel oil with 1 % sulfur",
        {
            "carbon": 0.869,
            "hydrogen": 0.111,
            "sulfur": 0.010,
            "oxygen": 0.004,
            "nitrogen": 0.004,
            "water": 0.0015,
            "ash": 0.0005,
        },
        source=_MEMORY,
        doubt="Sulfur runs from 0.003 to 0.035; it decides the acid dew point.",
    ),
    _fuel(
        "wood-chips-wet",
        "fresh softwood chips, half water",
        _wet(_SOFTWOOD, 0.50),
        source=f"{_SOFTWOOD_SOURCE}, with 50 % water as fired",
        doubt=_WOOD_DOUBT,
    ),
    _fuel(
        "wood-chips-dry",
        "air-dry softwood chips and mill residues, one fifth water",
        _wet(_SOFTWOOD, 0.20),
        source=f"{_SOFTWOOD_SOURCE}, with 20 % water as fired",
        doubt=_WOOD_DOUBT,
    ),
    _fuel(
        "sander-dust",
        "dry softwood dust and veneer trimmings, 7 % water",
        _wet(_SOFTWOOD, 0.07),
        source=f"{_SOFTWOOD_SOURCE}, with 7 % water as fired",
        doubt="Glue adds nitrogen, sand and salt; analyse it.",
    ),
    _fuel(
        "bark",
        "softwood bark from wet debarking, 58 % water",
        _wet(_BARK, 0.58),
        source="typical dry values of coniferous bark as in EN ISO 17225-1, annex B, from memory, with 58 % water as "
        "fired",
        doubt="Water runs from 0.45 to 0.65 and ash from 0.01 to 0.1 with sand: measure them.",
    ),
)

FUELS: MappingProxyType[str, Fuel] = MappingProxyType({f.slug: f for f in _FUELS})


def fuel_records() -> tuple[Fuel, ...]:
    """All typical fuels."""
    return _FUELS
