"""What fluids there are, within which limits and how good: the list behind the service's catalogue."""

from dataclasses import dataclass
from functools import cache

from crossbank_service.properties._fluids import FLUIDS, FluidName
from crossbank_service.properties._limits import pure_limits
from crossbank_service.properties.gas_mixture import COUNTED_MOLE_FRACTION
from crossbank_service.properties.gas_mixture import TEMPERATURE_LIMITS_K as GAS_LIMITS_K
from crossbank_service.properties.moist_air import TEMPERATURE_LIMITS_K as MOIST_AIR_LIMITS_K
from crossbank_service.properties.real_gas import HIGHEST_DEVIATION, NOTABLE_DEVIATION
from crossbank_service.properties.solution import SOLUTIONS, SolutionName, solution_limits

_REFERENCE = "reference equation of state and transport equations of the fluid as collected in CoolProp"
_SPLINE_ERROR = (
    "interpolation within 0.001 % in density and enthalpy, 0.01 % in heat capacity, 0.03 % in viscosity"
    " and 0.1 % in conductivity for 95 % of the states, up to 0.2 % in heat capacity and 6 % in gas"
    " conductivity beside the critical point; the equations themselves: about 0.1 % in density, 1 % in"
    " heat capacity, 2-5 % in viscosity and conductivity"
)
_SOLUTION_SOURCE = "property functions of Melinder for secondary working fluids, as collected in CoolProp"
_SOLUTION_ERROR = (
    "interpolation within 0.01 %; the functions: 0.5 % in density, 2 % in heat capacity,"
    " 3 % in conductivity, 5 % in viscosity"
)


@dataclass(frozen=True, slots=True, kw_only=True)
class FluidRecord:
    """One fluid of the catalogue.

    Attributes
    ----------
    slug : str
        Name in requests.
    kind : str
        ``pure`` or ``solution``: the tag of the fluid object it goes in.
    phases : tuple of str
        ``liquid`` and/or ``gas``.
    condensing : bool
        Whether it can condense inside the tubes.
    lowest_temperature_k, highest_temperature_k : float
        Overall; ``limits_note`` says what bounds each phase.
    highest_pressure_pa : float or None
        None where the pressure has no influence or only the ideal gas bounds it.
    critical_temperature_k, critical_pressure_pa : float or None
        Of a pure fluid.
    highest_mass_fraction : float or None
        Of the solute of a solution.
    limits_note, source, stated_error : str
        Sentences for people.
    doubt : str or None
        What to know before relying on it.
    """

    slug: str
    kind: str
    phases: tuple[str, ...]
    condensing: bool
    lowest_temperature_k: float
    highest_temperature_k: float
    highest_pressure_pa: float | None
    critical_temperature_k: float | None
    critical_pressure_pa: float | None
    highest_mass_fraction: float | None
    limits_note: str
    source: str
    stated_error: str
    doubt: str | None


def _pure(entry: FluidName) -> FluidRecord:
    limits = pure_limits(entry.slug)
    top = limits.liquid_highest_temperature_k
    if top is None:
        note = "A gas only, no denser than 0.8 of its critical density."
    else:
        note = (
            f"Liquid above its saturation pressure up to {top:.1f} K; gas below it; from there to"
            f" {1.2 * limits.critical_temperature_k:.1f} K a gas no denser than saturated vapour at"
            f" {top:.1f} K, above that no denser than 0.8 of the critical density."
        )
        note += " The rise of the freezing point with pressure is not followed."
    return FluidRecord(
        slug=entry.slug,
        kind="pure",
        phases=("gas",) if top is None else ("liquid", "gas"),
        condensing=top is not None,
        lowest_temperature_k=limits.lowest_temperature_k,
        highest_temperature_k=limits.gas_highest_temperature_k,
        highest_pressure_pa=limits.highest_pressure_pa,
        critical_temperature_k=limits.critical_temperature_k,
        critical_pressure_pa=limits.critical_pressure_pa,
        highest_mass_fraction=None,
        limits_note=note,
        source=_REFERENCE,
        stated_error=_SPLINE_ERROR,
        doubt=entry.doubt,
    )


def _solution(entry: SolutionName) -> FluidRecord:
    limits = solution_limits(entry.slug)
    return FluidRecord(
        slug=entry.slug,
        kind="solution",
        phases=("liquid",),
        condensing=False,
        lowest_temperature_k=limits.lowest_temperature_k,
        highest_temperature_k=limits.highest_temperature_k,
        highest_pressure_pa=None,
        critical_temperature_k=None,
        critical_pressure_pa=None,
        highest_mass_fraction=limits.highest_mass_fraction,
        limits_note="From the freezing point up, which depends on the mass fraction of"
        f" {entry.solute} ({limits.lowest_temperature_k:.1f} K at {limits.highest_mass_fraction:g});"
        " boiling is not watched.",
        source=_SOLUTION_SOURCE,
        stated_error=_SOLUTION_ERROR,
        doubt="The mass fraction is meant, not the volume fraction; inhibitors shift the properties.",
    )


_MIXTURE_SOURCE = (
    "own fits to the low-density values of the reference equations (CoolProp; steam: IAPWS), ideal gas; Wilke 1950 for"
    " viscosity, Mason and Saxena 1958 for conductivity"
)
_MIXTURE_ERROR = (
    "0.1 % in heat capacity, 1-2 % in viscosity, 3-4 % in conductivity (5 % when rich in steam); density as an"
    " ideal gas: within 0.3 % below 3 bar above 320 K"
)


def _family(slug: str, limits: tuple[float, float], note: str, doubt: str | None) -> FluidRecord:
    return FluidRecord(
        slug=slug,
        kind=slug,
        phases=("gas",),
        condensing=False,
        lowest_temperature_k=limits[0],
        highest_temperature_k=limits[1],
        highest_pressure_pa=None,
        critical_temperature_k=None,
        critical_pressure_pa=None,
        highest_mass_fraction=None,
        limits_note=note,
        source=_MIXTURE_SOURCE,
        stated_error=_MIXTURE_ERROR,
        doubt=doubt,
    )


_DENSE = (
    f"Up to the pressure where the density departs from the ideal gas by {HIGHEST_DEVIATION:.0%};"
    f" from {NOTABLE_DEVIATION:.0%} on the answer says so."
)


@cache
def mixture_records() -> tuple[FluidRecord, ...]:
    """The families of gas mixtures: fluids by composition, not by name; the slug is the tag of the fluid object."""
    return (
        _family("moist-air", MOIST_AIR_LIMITS_K, "A gas; the vapour is water's.", None),
        _family(
            "gas-mixture",
            GAS_LIMITS_K,
            f"A gas. Every gas of {COUNTED_MOLE_FRACTION:.0%} or more narrows the temperatures to its own range."
            f" {_DENSE}",
            "Nothing reacts or dissociates; of condensing vapours only water's is computed on the outside.",
        ),
        _family(
            "combustion-gas",
            GAS_LIMITS_K,
            f"A gas. {_DENSE}",
            "Complete combustion: no carbon monoxide, soot or nitrogen oxides; all sulfur burns to the dioxide.",
        ),
    )


@cache
def fluid_records() -> tuple[FluidRecord, ...]:
    """All fluids on offer by name: pure fluids, then solutions."""
    return (*(_pure(f) for f in FLUIDS.values()), *(_solution(s) for s in SOLUTIONS.values()))
