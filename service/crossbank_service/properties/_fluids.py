"""The pure fluids on offer: this house's names and the reference equations behind them."""

from dataclasses import dataclass
from types import MappingProxyType


@dataclass(frozen=True, slots=True)
class FluidName:
    """A pure fluid with reference equations for density, energy, viscosity and conductivity.

    ``supercritical_only`` marks a fluid offered as a gas well above its critical point alone;
    ``hydrocarbon`` selects the hydrocarbon form of correlations that have one. ``lowest_k`` is set where the
    transport equations fail or bend the wrong way below it.
    """

    slug: str
    equation: str
    hydrocarbon: bool = False
    supercritical_only: bool = False
    lowest_k: float = 0.0
    doubt: str | None = None


_NAMES = (
    FluidName("air", "Air", supercritical_only=True),
    FluidName("ammonia", "Ammonia"),
    FluidName("argon", "Argon", supercritical_only=True),
    FluidName("benzene", "Benzene", hydrocarbon=True),
    FluidName("carbon-dioxide", "CarbonDioxide"),
    FluidName("cyclopentane", "Cyclopentane", hydrocarbon=True),
    FluidName("ethane", "Ethane", hydrocarbon=True),
    FluidName("ethanol", "Ethanol"),
    FluidName("ethylbenzene", "EthylBenzene", hydrocarbon=True, lowest_k=265.0),
    FluidName("helium", "Helium", supercritical_only=True),
    FluidName("hydrogen", "Hydrogen", supercritical_only=True),
    FluidName("isobutane", "IsoButane", hydrocarbon=True),
    FluidName("isopentane", "Isopentane", hydrocarbon=True),
    FluidName("m-xylene", "m-Xylene", hydrocarbon=True),
    FluidName("methane", "Methane", hydrocarbon=True),
    FluidName("methanol", "Methanol"),
    FluidName("n-butane", "n-Butane", hydrocarbon=True),
    FluidName("n-decane", "n-Decane", hydrocarbon=True),
    FluidName("n-dodecane", "n-Dodecane", hydrocarbon=True),
    FluidName("n-heptane", "n-Heptane", hydrocarbon=True),
    FluidName("n-hexane", "n-Hexane", hydrocarbon=True),
    FluidName("n-nonane", "n-Nonane", hydrocarbon=True),
    FluidName("n-octane", "n-Octane", hydrocarbon=True),
    FluidName("n-pentane", "n-Pentane", hydrocarbon=True, lowest_k=190.0),
    FluidName("nitrogen", "Nitrogen", supercritical_only=True),
    FluidName("o-xylene", "o-Xylene", hydrocarbon=True),
    FluidName("oxygen", "Oxygen", supercritical_only=True),
    FluidName("p-xylene", "p-Xylene", hydrocarbon=True),
    FluidName("propane", "n-Propane", hydrocarbon=True),
    FluidName("propylene", "Propylene", hydrocarbon=True, lowest_k=170.0),
    FluidName("r22", "R22", lowest_k=195.0),
    FluidName("r23", "R23"),
    FluidName("r32", "R32", lowest_k=235.0),
    FluidName("r123", "R123", lowest_k=180.0),
    FluidName("r125", "R125"),
    FluidName("r134a", "R134a"),
    FluidName("r143a", "R143a", lowest_k=195.0),
    FluidName("r152a", "R152A", lowest_k=200.0),
    FluidName("r227ea", "R227EA", lowest_k=250.0),
    FluidName("r236fa", "R236FA", lowest_k=235.0),
    FluidName("r245fa", "R245fa", lowest_k=205.0),
    FluidName("r1234yf", "R1234yf", lowest_k=220.0),
    FluidName("r1234ze-e", "R1234ze(E)"),
    FluidName("sulfur-hexafluoride", "SulfurHexafluoride"),
    FluidName("toluene", "Toluene", hydrocarbon=True),
    FluidName("water", "Water"),
)

FLUIDS: MappingProxyType[str, FluidName] = MappingProxyType({f.slug: f for f in _NAMES})


FLOOR_K = 145.0
"""No pure fluid is offered below this temperature,"""
FLOOR_REDUCED = 0.36
"""nor below this share of its critical temperature, where transport equations are rarely sound."""


def fluid(slug: str) -> FluidName:
    """Look up a fluid; ``KeyError`` lists what there is."""
    try:
        return FLUIDS[slug]
    except KeyError:
        raise KeyError(f"unknown fluid {slug!r}; known fluids: {', '.join(FLUIDS)}") from None
