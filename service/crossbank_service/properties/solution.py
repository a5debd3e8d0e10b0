"""Heat-transfer solutions: glycols, alcohols and salts in water, by mass fraction."""

from dataclasses import dataclass
from types import MappingProxyType
from typing import ClassVar, Self

import numpy as np
from numpy.typing import NDArray
from scipy.interpolate import make_interp_spline

from crossbank_service.properties._arrays import spread
from crossbank_service.properties._coolprop import built_once, open_state
from crossbank_service.properties._splines import Spline1, Spline2, lobatto
from crossbank_service.properties.medium import Array, State


@dataclass(frozen=True, slots=True)
class SolutionName:
    """A solution on offer; ``highest_fraction`` bounds the mass fraction of the solute."""

    slug: str
    equation: str
    solute: str
    highest_fraction: float


_NAMES = (
    SolutionName("ethylene-glycol-water", "MEG", "ethylene glycol", 0.6),
    SolutionName("propylene-glycol-water", "MPG", "propylene glycol", 0.6),
    SolutionName("ethanol-water", "MEA", "ethanol", 0.6),
    SolutionName("methanol-water", "MMA", "methanol", 0.6),
    SolutionName("glycerol-water", "MGL", "glycerol", 0.6),
    SolutionName("calcium-chloride-water", "MCA", "calcium chloride", 0.3),
    SolutionName("sodium-chloride-water", "MNA", "sodium chloride", 0.23),
    SolutionName("magnesium-chloride-water", "MMG", "magnesium chloride", 0.2),
    SolutionName("lithium-chloride-water", "MLI", "lithium chloride", 0.24),
    SolutionName("potassium-carbonate-water", "MKC", "potassium carbonate", 0.4),
    SolutionName("potassium-acetate-water", "MKA", "potassium acetate", 0.45),
    SolutionName("potassium-formate-water", "MKF", "potassium formate", 0.48),
)

SOLUTIONS: MappingProxyType[str, SolutionName] = MappingProxyType({s.slug: s for s in _NAMES})


def solution(slug: str) -> SolutionName:
    """Look up a solution; ``KeyError`` lists what there is."""
    try:
        return SOLUTIONS[slug]
    except KeyError:
        raise KeyError(f"unknown solution {slug!r}; known solutions: {', '.join(SOLUTIONS)}") from None


@dataclass(frozen=True, slots=True)
class _Table:
    """Coordinates: mass fraction, and the share y of the way from freezing to the highest temperature."""

    highest_k: float
    freezing: Spline1
    values: Spline2


@built_once
def _table(slug: str) -> _Table:
    import CoolProp  # noqa: PLC0415

    name = solution(slug)
    state = open_state("INCOMP", name.equation)
    fractions = lobatto(0.0, name.highest_fraction, 24)
    shares = lobatto(0.0, 1.0, 20)
    state.set_mass_fractions([0.1])
    highest = state.Tmax()
    freezing = np.empty(len(fractions))
    values = np.empty((len(fractions), len(shares), 5))
    for i, x in enumerate(fractions):
        state.set_mass_fractions([float(x)])
        freezing[i] = state.keyed_output(CoolProp.iT_freeze)
        for j, y in enumerate(shares):
            # a hair above freezing, where the equations refuse; pressure only has to exceed the vapour's
            t = max(freezing[i] + y * (highest - freezing[i]), freezing[i] + 1e-6)
            state.update(CoolProp.PT_INPUTS, 1e6, t)
            values[i, j] = (
                state.rhomass(),
                state.cpmass(),
                np.log(state.viscosity()),
                np.log(state.conductivity()),
                0.0,
            )
        heat = make_interp_spline(shares, values[i, :, 1], k=5).antiderivative()
        values[i, :, 4] = (highest - freezing[i]) * heat(shares)
    return _Table(highest, Spline1(fractions, freezing), Spline2(fractions, shares, values))


def freezing_temperature(name: str, mass_fraction: Array) -> Array:
    """Freezing temperature of a solution.

    Parameters
    ----------
    name : str
        Slug of the solution.
    mass_fraction : Array
        Of the solute in the solution [-]; held within the limits.

    Returns
    -------
    Array
        [K]; where ice first forms. Below it slush, then solid.
    """
    return _table(name).freezing(np.asarray(mass_fraction, dtype=np.float64))


@dataclass(frozen=True, slots=True, kw_only=True)
class SolutionLimits:
    """Limits of a solution; ``lowest_temperature_k`` is its freezing point at the highest fraction."""

    highest_mass_fraction: float
    lowest_temperature_k: float
    highest_temperature_k: float


def solution_limits(name: str) -> SolutionLimits:
    """Limits of a solution; builds its table at the first call."""
    table, top = _table(name), solution(name).highest_fraction
    return SolutionLimits(
        highest_mass_fraction=top,
        lowest_temperature_k=float(table.freezing(np.array(top))),
        highest_temperature_k=table.highest_k,
    )


@dataclass(frozen=True, slots=True)
class Solution:
    """A liquid solution of given mass fraction in N cases.

    Attributes
    ----------
    name : str
        A slug of the catalogue, such as ``ethylene-glycol-water``.
    mass_fraction : Array
        kg of solute a kg of solution [-], shape (N,).

    Notes
    -----
    Melinder's property functions as coded in CoolProp, splined over mass fraction and temperature; the
    pressure has no influence. The source states 0.5 % in density, 1-2 % in heat capacity, 3 % in
    conductivity and 5 % in viscosity (from memory); inhibitors of commercial fluids shift them. Below
    freezing and above the highest temperature the end values are held and the enthalpy goes on linearly.
    """

    name: str
    mass_fraction: Array
    gas: ClassVar[bool] = False

    def __post_init__(self) -> None:
        solution(self.name)

    def at(self, temperature_k: Array, pressure_pa: Array) -> State:
        """Properties at temperatures of shape (N, ...); ``pressure_pa`` only broadcasts."""
        values, shape, _ = self._values(temperature_k, pressure_pa)
        return State(
            density_kg_m3=values[0].reshape(shape),
            heat_capacity_j_kg_k=values[1].reshape(shape),
            conductivity_w_m_k=np.exp(values[3]).reshape(shape),
            viscosity_pa_s=np.exp(values[2]).reshape(shape),
        )

    def enthalpy(self, temperature_k: Array, pressure_pa: Array) -> Array:
        """Specific enthalpy [J/kg], zero at the freezing point of the case's mass fraction."""
        values, shape, beyond = self._values(temperature_k, pressure_pa)
        return np.asarray((values[4] + values[1] * beyond).reshape(shape))

    def take(self, index: NDArray[np.intp]) -> Self:
        """Select cases by index."""
        return type(self)(self.name, self.mass_fraction[index])

    def _values(self, temperature_k: Array, pressure_pa: Array) -> tuple[Array, tuple[int, ...], Array]:
        table = _table(self.name)
        t, _ = np.broadcast_arrays(np.asarray(temperature_k, dtype=np.float64), pressure_pa)
        x, _ = np.broadcast_arrays(spread(self.mass_fraction, t), t)
        flat_t, flat_x = np.ascontiguousarray(t.ravel()), np.ascontiguousarray(x.ravel())
        freezing = table.freezing(flat_x)
        held = np.clip(flat_t, freezing, table.highest_k)
        share = (held - freezing) / (table.highest_k - freezing)
        return table.values(flat_x, share), t.shape, flat_t - held
