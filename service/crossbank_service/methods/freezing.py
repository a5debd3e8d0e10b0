"""Freezing of condensate in steam coils and of liquids in tubes."""

import numpy as np
from numpy.typing import NDArray

from crossbank_service.methods.criterion import (
    BEYOND,
    NEAR,
    NO,
    UNASSESSED,
    UNKNOWN,
    WITHIN,
    YES,
    Answers,
    Codes,
    Criterion,
    Values,
)
from crossbank_service.methods.record import Array

ICE_POINT_K = 273.15
AIR_ON_SAFE_K = ICE_POINT_K + 2.0
DISTRIBUTING_BELOW_K = ICE_POINT_K - 5.0
LEAST_LEG_M = 0.3


def flooded_end_temperature_k(
    air_temperature_k: Values,
    saturation_k: Values,
    flooded_conductance_w_k: Values,
    condensate_kg_s: Values,
    heat_capacity_j_kg_k: Values,
) -> Array:
    """Temperature of condensate at the end of a flooded length.

    Parameters
    ----------
    air_temperature_k : array_like
        Air over the flooded length [K].
    saturation_k : array_like
        Temperature at which the condensate enters it [K].
    flooded_conductance_w_k : array_like
        UA of the flooded length [W/K].
    condensate_kg_s : array_like
        Condensate through it [kg/s].
    heat_capacity_j_kg_k : array_like
        Heat capacity of the condensate [J/(kg K)].

    Returns
    -------
    Array
        Temperature [K]; that of the air where nothing flows.

    Notes
    -----
    T = Ta + (Ts - Ta) exp(-UA/(m c)).
    """
    air = np.asarray(air_temperature_k, dtype=np.float64)
    capacity = np.maximum(np.asarray(condensate_kg_s, dtype=np.float64) * heat_capacity_j_kg_k, 1e-12)
    ntu = np.minimum(np.asarray(flooded_conductance_w_k) / capacity, 700.0)
    return np.asarray(air + (saturation_k - air) * np.exp(-ntu))


def standstill_time_to_freezing_s(
    liquid_temperature_k: Values,
    air_temperature_k: Values,
    freezing_temperature_k: Values,
    heat_capacity_j_k: Values,
    conductance_w_k: Values,
    longest_s: float = 1e9,
) -> Array:
    """Time until liquid standing in cold air begins to freeze.

    Parameters
    ----------
    liquid_temperature_k, air_temperature_k, freezing_temperature_k : array_like
        Liquid at the stop, air, freezing point [K].
    heat_capacity_j_k : array_like
        Heat capacity of liquid and metal [J/K].
    conductance_w_k : array_like
        UA between liquid and air [W/K].
    longest_s : float
        Given where it never freezes [s].

    Returns
    -------
    Array
        Time [s]; 0 where the liquid is at or below its freezing point.

    Notes
    -----
    One lump: t = C/UA ln((T0 - Ta)/(Tf - Ta)). The coldest tube is there sooner: a time to plan by, no
    promise.
    """
    liquid, air, freezing = np.broadcast_arrays(
        np.asarray(liquid_temperature_k, dtype=np.float64), air_temperature_k, freezing_temperature_k
    )
    freezes = (air < freezing) & (liquid > freezing)
    ratio = np.where(freezes, (liquid - air) / np.where(freezes, freezing - air, 1.0), 1.0)
    constant = np.asarray(heat_capacity_j_k) / np.maximum(conductance_w_k, 1e-12)
    time = np.minimum(constant * np.log(ratio), longest_s)
    return np.where(liquid <= freezing, 0.0, np.where(freezes, time, longest_s))


def grade_freezing(
    lowest_air_k: Values,
    *,
    throttled: Answers,
    stalls: Answers,
    trap: Answers,
    vacuum_breaker: Answers,
    leg_m: Values,
    drains: Answers,
    distributing: Answers,
) -> Codes:
    """Grade the freezing of condensate in a steam coil.

    Parameters
    ----------
    lowest_air_k : array_like
        Lowest air-on temperature of all states [K].
    throttled, stalls, trap, vacuum_breaker, drains, distributing : array_like
        YES, NO or UNKNOWN: capacity held by throttling the steam; any state stalls; a trap sized for the
        low head; a vacuum breaker; tubes pitched to drain; steam-distributing inner tubes.
    leg_m : array_like
        Drain leg above the trap [m]; negative where not stated.

    Returns
    -------
    Codes
        Index into the verdict words; never within below +2 C, because a trap, valve or damper can fail.

    Notes
    -----
    Below +2 C near at best, and only with full steam pressure, no stall, trap, breaker, 0.3 m of leg,
    drained tubes, and distributing tubes below -5 C. Any of these known to fail is beyond; one not stated
    is unassessed. Common practice, no source.
    """
    air = np.asarray(lowest_air_k, dtype=np.float64)
    leg = np.asarray(leg_m, dtype=np.float64)
    leg_stated = np.where(leg < 0.0, UNKNOWN, np.where(leg >= LEAST_LEG_M, YES, NO))
    inner_tubes = np.where(air < DISTRIBUTING_BELOW_K, np.asarray(distributing), YES)
    wanted_no = (np.asarray(throttled), np.asarray(stalls))
    wanted_yes = (
        np.asarray(trap),
        np.asarray(vacuum_breaker),
        leg_stated,
        np.asarray(drains),
        inner_tubes,
    )
    shape = np.broadcast_shapes(air.shape, *(x.shape for x in (*wanted_no, *wanted_yes)))
    fails = np.zeros(shape, dtype=bool)
    open_question = np.zeros(shape, dtype=bool)
    for answers, good in (*((x, NO) for x in wanted_no), *((x, YES) for x in wanted_yes)):
        fails = fails | ((answers != good) & (answers != UNKNOWN))
        open_question = open_question | (answers == UNKNOWN)
    cold = np.where(fails, BEYOND, np.where(open_question, UNASSESSED, NEAR))
    known = np.isfinite(air)
    return np.where(known, np.where(air >= AIR_ON_SAFE_K, WITHIN, cold), UNASSESSED).astype(np.int8)


def grade_liquid_freezing(
    wall_less_freezing_k: Values,
    lowest_air_k: Values,
    *,
    plain_water: NDArray[np.bool_] | bool,
    flow_proven: Answers,
) -> Codes:
    """Grade the freezing of a liquid in the tubes.

    Parameters
    ----------
    wall_less_freezing_k : array_like
        Coldest inner wall less freezing point of the liquid, a temperature difference [K].
    lowest_air_k : array_like
        Lowest air-on temperature [K].
    plain_water : array_like
        True for water without antifreeze.
    flow_proven : array_like
        YES, NO or UNKNOWN: a proven flow and a cut-out that shuts the air.

    Returns
    -------
    Codes
        Index into the verdict words.

    Notes
    -----
    5 K above the freezing point within, 2 K near; plain water in air below +2 C is beyond unless flow is
    proven, and then near at best. Common practice, no source.
    """
    codes = LIQUID_FREEZING.grade(wall_less_freezing_k)
    exposed = np.asarray(plain_water, dtype=bool) & (
        np.asarray(lowest_air_k, dtype=np.float64) < AIR_ON_SAFE_K
    )
    proven = np.asarray(flow_proven) == YES
    at_best = np.where(exposed & ~proven, BEYOND, np.where(exposed, NEAR, WITHIN))
    unknown = (codes == UNASSESSED) & (at_best != BEYOND)
    return np.where(
        unknown, UNASSESSED, np.maximum(np.where(codes == UNASSESSED, BEYOND, codes), at_best)
    ).astype(np.int8)


AIR_ON = Criterion(
    slug="air-on-freezing",
    check="condensate-freezing",
    quantity="lowest air-on temperature",
    unit="K",
    sense="at-least",
    beyond=AIR_ON_SAFE_K,
    near=AIR_ON_SAFE_K,
    source="common practice, no source",
    trust="practice",
    needs=("lowest air-on temperature", "control", "trap", "vacuum breaker"),
    caution=(
        "A coil that passes can still freeze when a trap, valve, damper or fan fails: fit a "
        "low-temperature cut-out on the coil, set to 2 to 3 C."
    ),
)
LIQUID_FREEZING = Criterion(
    slug="wall-over-freezing-point",
    check="liquid-freezing",
    quantity="coldest inner wall less freezing point",
    unit="K",
    sense="at-least",
    beyond=2.0,
    near=5.0,
    source="common practice, no source",
    trust="practice",
    needs=("freezing point", "coldest wall"),
    caution="A coil that passes can still freeze when the pump stops: drain it, or keep the air away.",
)
CRITERIA = (AIR_ON, LIQUID_FREEZING)
