"""Where each pure fluid can be asked for."""

from dataclasses import dataclass

from crossbank_service.properties._coolprop import built_once, open_state
from crossbank_service.properties._fluids import FLOOR_K, FLOOR_REDUCED, fluid

SATURATED_TOP = 0.96
"""Liquid and vapour tables end at this share of the critical temperature."""
SATURATION_TOP = 0.99
"""Saturation tables end at this share of the critical temperature."""
HOT = 1.2
"""From this share of the critical temperature up a gas may be dense."""
HIGHEST_PRESSURE_PA = 40e6


@dataclass(frozen=True, slots=True, kw_only=True)
class PureLimits:
    """Limits of a pure fluid.

    The ``liquid`` limits are None for a fluid offered as a gas alone. A liquid must also be above its
    saturation pressure and a gas below it; between 0.96 and 1.2 of the critical temperature a gas may be as
    dense as saturated vapour at 0.96, above that 0.8 of the critical density. ``saturation`` limits are
    those of condensing.
    """

    molar_mass_kg_mol: float
    critical_temperature_k: float
    critical_pressure_pa: float
    lowest_temperature_k: float
    liquid_highest_temperature_k: float | None
    saturation_highest_temperature_k: float | None
    gas_highest_temperature_k: float
    highest_pressure_pa: float


@built_once
def pure_limits(name: str) -> PureLimits:
    """Limits of a pure fluid.

    Parameters
    ----------
    name : str
        Slug of the fluid.

    Returns
    -------
    PureLimits
        Cheap: no table is built.
    """
    entry = fluid(name)
    state = open_state("HEOS", entry.equation)
    critical = state.T_critical()
    if entry.supercritical_only:
        lowest = max(HOT * critical, FLOOR_K)
    else:
        lowest = max(state.Tmin(), FLOOR_K, FLOOR_REDUCED * critical, entry.lowest_k)
    return PureLimits(
        molar_mass_kg_mol=state.molar_mass(),
        critical_temperature_k=critical,
        critical_pressure_pa=state.p_critical(),
        lowest_temperature_k=lowest,
        liquid_highest_temperature_k=None if entry.supercritical_only else SATURATED_TOP * critical,
        saturation_highest_temperature_k=None if entry.supercritical_only else SATURATION_TOP * critical,
        gas_highest_temperature_k=state.Tmax(),
        highest_pressure_pa=min(state.pmax(), HIGHEST_PRESSURE_PA),
    )
