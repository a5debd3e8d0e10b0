"""Units for people: what a number in SI reads as in metric, SI or US customary units. Used at the edge only.

US factors: 1 in = 0.0254 m, 1 ft = 0.3048 m, 1 lb = 0.45359237 kg (exact), 1 lbf/in2 = 6894.757 Pa,
1 Btu (IT) = 1055.05585262 J (exact), conventional inch of water 249.0889 Pa; NIST Special Publication 811,
appendix B.8.
"""

from dataclasses import dataclass

INCH, FOOT, POUND = 0.0254, 0.3048, 0.45359237
BTU, HOUR = 1055.05585262, 3600.0
PSI = POUND * 9.80665 / INCH**2
INCH_OF_WATER = 249.0889
RANKINE = 5.0 / 9.0


@dataclass(frozen=True)
class Unit:
    """A unit: its sign, how many of it one SI unit is, the offset added then, decimals that make sense."""

    sign: str
    per_si: float = 1.0
    offset: float = 0.0
    decimals: int = 2

    def of(self, si: float) -> float:
        """Convert from SI."""
        return si * self.per_si + self.offset

    def text(self, si: float | None) -> str:
        """Write a number in this unit without the sign; a dash where there is none."""
        if si is None:
            return "–"
        value = self.of(si)
        small = value != 0.0 and abs(value) < 10.0**-self.decimals
        return f"{value:.2e}" if small else f"{value:.{self.decimals}f}"


_SI = {
    "temperature": Unit("K", decimals=2),
    "difference": Unit("K", decimals=2),
    "pressure": Unit("Pa", decimals=0),
    "draught": Unit("Pa", decimals=1),
    "length": Unit("m", decimals=3),
    "small-length": Unit("m", decimals=5),
    "area": Unit("m²", decimals=2),
    "volume": Unit("m³", decimals=4),
    "mass": Unit("kg", decimals=1),
    "mass-flow": Unit("kg/s", decimals=4),
    "mass-flux": Unit("kg/(m²s)", decimals=1),
    "velocity": Unit("m/s", decimals=2),
    "density": Unit("kg/m³", decimals=3),
    "heat": Unit("W", decimals=0),
    "power": Unit("W", decimals=1),
    "conductance": Unit("W/K", decimals=1),
    "coefficient": Unit("W/(m²K)", decimals=1),
    "count": Unit("", decimals=0),
    "number": Unit("", decimals=3),
    "percent": Unit("%", 100.0, decimals=1),
    "humidity": Unit("kg/kg dry", decimals=5),
}

_METRIC = _SI | {
    "temperature": Unit("°C", offset=-273.15, decimals=1),
    "difference": Unit("K", decimals=1),
    "pressure": Unit("kPa", 1e-3, decimals=2),
    "small-length": Unit("mm", 1e3, decimals=2),
    "volume": Unit("L", 1e3, decimals=1),
    "mass-flow": Unit("kg/s", decimals=3),
    "heat": Unit("kW", 1e-3, decimals=2),
    "conductance": Unit("kW/K", 1e-3, decimals=3),
}

_US = _SI | {
    "humidity": Unit("lb/lb dry", decimals=5),
    "temperature": Unit("°F", 1.0 / RANKINE, -459.67, 1),
    "difference": Unit("°F diff", 1.0 / RANKINE, decimals=1),
    "pressure": Unit("psi", 1.0 / PSI, decimals=3),
    "draught": Unit("inH2O", 1.0 / INCH_OF_WATER, decimals=3),
    "length": Unit("ft", 1.0 / FOOT, decimals=2),
    "small-length": Unit("in", 1.0 / INCH, decimals=3),
    "area": Unit("ft²", 1.0 / FOOT**2, decimals=1),
    "volume": Unit("ft³", 1.0 / FOOT**3, decimals=2),
    "mass": Unit("lb", 1.0 / POUND, decimals=0),
    "mass-flow": Unit("lb/h", HOUR / POUND, decimals=0),
    "mass-flux": Unit("lb/(h ft²)", HOUR * FOOT**2 / POUND, decimals=0),
    "velocity": Unit("ft/min", 60.0 / FOOT, decimals=0),
    "density": Unit("lb/ft³", FOOT**3 / POUND, decimals=4),
    "heat": Unit("Btu/h", HOUR / BTU, decimals=0),
    "power": Unit("hp", 1.0 / (550.0 * FOOT * POUND * 9.80665), decimals=3),
    "conductance": Unit("Btu/(h °F)", HOUR * RANKINE / BTU, decimals=1),
    "coefficient": Unit("Btu/(h ft² °F)", HOUR * RANKINE * FOOT**2 / BTU, decimals=2),
}

SYSTEMS: dict[str, dict[str, Unit]] = {"metric": _METRIC, "si": _SI, "us": _US}
"""System of units by name; each maps a kind of quantity to its unit."""
