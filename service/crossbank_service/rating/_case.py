"""One checked request in the engine's own terms: plain numbers, families of fluids, slugs of methods."""

from dataclasses import dataclass, field
from typing import Literal

from crossbank.contract import Assumed, RateRequest
from crossbank_service.properties import psychrometrics
from crossbank_service.properties.moist_air import MASS_RATIO
from crossbank_service.rating._circuit import Circuit

Curve = tuple[tuple[float, ...], tuple[float, ...]]
NARROW_GAS_K = 600.0
NARROW_LIQUID_K = 120.0

SurfaceKind = Literal["plain", "annular", "serrated", "plate"]
InsideKind = Literal["held-surface", "condensing", "single-phase"]


@dataclass(frozen=True)
class FluidInput:
    """A fluid by family (what may stand in one medium) and its own numbers.

    Attributes
    ----------
    family : tuple
        Such as ``("pure", "water", "liquid")``; fluids of one family differ in ``numbers`` only.
    numbers : tuple
        Parameters of this case: mass fraction, humidity ratio, mole fractions of all ``GASES``, or the lists of
        a table.
    """

    family: tuple[str, ...]
    numbers: tuple[float | tuple[float, ...] | None, ...] = ()
    gas: bool = True


def narrow(fluid: FluidInput, span: float) -> bool:
    """Whether the temperatures of a rating lie so close that local polynomials carry the properties."""
    if fluid.family[0] in ("table", "saturation"):
        return False
    return span <= (NARROW_GAS_K if fluid.gas else NARROW_LIQUID_K)


@dataclass(frozen=True)
class InsideInput:
    """The inside of a case; numbers without a meaning for its kind are 0."""

    kind: InsideKind
    fluid: FluidInput | None = None
    temperature: float = 0.0
    pressure: float = 0.0
    superheat: float = 0.0
    flow: float = 0.0
    fouling: float = 0.0
    loss_heads: float = 0.0


@dataclass(frozen=True)
class SectionInput:
    """Rows ``first`` to ``last`` - 1 (from 0) of one surface, with the methods that rate it.

    Attributes
    ----------
    kind : str
        ``plain``, ``annular``, ``serrated`` or ``plate``.
    bank, fins : dict
        The members of ``TubeBank`` and ``FinSet`` as numbers.
    conductivity, fin_conductivity : Curve
        Of tube and fin metal [W/(m K)] over temperature [K].
    bond : float
        Between fin and tube, on the bare tube [m2 K/W].
    """

    first: int
    last: int
    kind: SurfaceKind
    bank: dict[str, float]
    fins: dict[str, float]
    conductivity: Curve
    fin_conductivity: Curve
    bond: float
    attachment: str | None = None
    yaw: float = 0.0
    counted_from: int = 0
    heat_method: str = ""
    drop_method: str = ""

    @property
    def shape(self) -> tuple[object, ...]:
        """What sections of one array share."""
        return (
            self.first,
            self.last,
            self.kind,
            self.heat_method,
            self.drop_method,
            self.counted_from,
        )


@dataclass(frozen=True)
class Case:
    """A request that can be rated.

    Attributes
    ----------
    sections : tuple of SectionInput
        The rows by their surfaces, first row first.
    outside_flow, outside_temperature, outside_pressure, outside_fouling : float
        [kg/s], [K], [Pa], [m2 K/W]
    humidity_ratio, molar_ratio, water_mole_fraction, sulfur_dioxide_mole_fraction : float or None
        Of an outside gas of known composition: kg of water a kg of dry gas (None for steam), molar mass of water
        over that of the dry gas, mole fractions; None for every other fluid.
    methods : dict
        Slug by role, inside.
    cavities, cavity_depth : int, float
        How many, and their depth together [m].
    lanes : tuple
        Width [m] and strips of each lane beside the tubes.
    zones : tuple
        Area share and velocity ratio of each zone of the face; empty for an even stream.
    bypass : float
        Share of the outside stream that passes by the bank.
    idle : str or None
        Why the case exchanges no heat (a notice code); it is then rated with the heat balance left out.
    """

    request: RateRequest
    sections: tuple[SectionInput, ...]
    outside_fluid: FluidInput
    outside_flow: float
    outside_temperature: float
    outside_pressure: float
    outside_fouling: float
    humidity_ratio: float | None
    inside: InsideInput
    circuit: Circuit
    segments: int
    property_state: str
    methods: dict[str, str]
    idle: str | None = None
    cavities: int = 0
    cavity_depth: float = 0.0
    lanes: tuple[tuple[float, int], ...] = ()
    zones: tuple[tuple[float, float], ...] = ()
    bypass: float = 0.0
    assumed: tuple[Assumed, ...] = field(default_factory=tuple)
    molar_ratio: float = MASS_RATIO
    water_mole_fraction: float | None = None
    sulfur_dioxide_mole_fraction: float | None = None

    @property
    def bank(self) -> dict[str, float]:
        """The numbers of the first rows' bank: layout and bore are those of all rows."""
        return self.sections[0].bank

    @property
    def finned(self) -> bool:
        """Whether any row has fins."""
        return any(section.kind != "plain" for section in self.sections)

    @property
    def uneven(self) -> bool:
        """Whether part of the outside stream passes by the bank, or crosses it unevenly."""
        return bool(self.lanes or self.zones or self.bypass)

    @property
    def span(self) -> float:
        """Difference of the inlet temperatures, between which every temperature of the rating lies [K]."""
        return abs(self.outside_temperature - self.inside.temperature)

    @property
    def may_be_wet(self) -> bool:
        """Whether any surface could be below the dew point of the outside stream: its coldest inlet is."""
        if not self.humidity_ratio:
            return False
        vapour = self.outside_pressure * self.humidity_ratio / (self.humidity_ratio + self.molar_ratio)
        coldest = min(self.inside.temperature, self.outside_temperature)
        return float(psychrometrics.saturation_pressure(coldest)) < vapour

    @property
    def group(self) -> tuple[object, ...]:
        """Cases of one group are rated in one array."""
        fluid = self.inside.fluid
        return (
            self.inside.kind,
            self.outside_fluid.family,
            fluid.family if fluid else (),
            narrow(self.outside_fluid, self.span),
            fluid is not None and narrow(fluid, self.span),
            self.circuit,
            self.segments,
            self.property_state,
            tuple(sorted(self.methods.items())),
            tuple(section.shape for section in self.sections),
            # a dry case beside a wet one would go through its arithmetic, and round by it
            self.may_be_wet,
        )
