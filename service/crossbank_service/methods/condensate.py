"""Condensate leaving a steam coil: stall, head to the return, back-flow between rows, pitch of the tubes."""

import numpy as np

from crossbank_service.methods.criterion import (
    BEYOND,
    UNASSESSED,
    UNKNOWN,
    WITHIN,
    YES,
    Answers,
    Codes,
    Criterion,
    Values,
    grade,
)
from crossbank_service.methods.freezing import AIR_ON_SAFE_K
from crossbank_service.methods.record import Array

GRAVITY_M_S2 = 9.80665


def _kept_below_one(effectiveness: Values) -> Array:
    return np.clip(np.asarray(effectiveness, dtype=np.float64), 1e-9, 1.0 - 1e-9)


def steam_temperature_at_load_k(air_inlet_k: Values, air_outlet_k: Values, effectiveness: Values) -> Array:
    """Steam temperature a coil settles at when throttled to hold an air outlet temperature.

    Parameters
    ----------
    air_inlet_k, air_outlet_k : array_like
        Air on and air off at the load [K].
    effectiveness : array_like
        Effectiveness of the coil at this air flow, clean (fouling lowers it and hides the stall).

    Returns
    -------
    Array
        Saturation temperature in the coil [K].

    Notes
    -----
    Ts = Tin + (Tout - Tin)/e: a condensing coil's effectiveness depends on the air flow alone.
    """
    air_in = np.asarray(air_inlet_k, dtype=np.float64)
    return np.asarray(air_in + (air_outlet_k - air_in) / _kept_below_one(effectiveness))


def stall_air_temperature_k(air_outlet_k: Values, effectiveness: Values, back_saturation_k: Values) -> Array:
    """Air-on temperature above which a coil throttled to hold its outlet temperature floods.

    Parameters
    ----------
    air_outlet_k : array_like
        Air off, held by throttling [K].
    effectiveness : array_like
        Effectiveness of the clean coil at this air flow.
    back_saturation_k : array_like
        Saturation temperature at the pressure the condensate has to overcome [K].

    Returns
    -------
    Array
        Air-on temperature [K]; not above 0 K means the throttled coil stalls at every air temperature.

    Notes
    -----
    Ta = (Tout - e Ts)/(1 - e).
    """
    e = _kept_below_one(effectiveness)
    return np.asarray((np.asarray(air_outlet_k) - e * np.asarray(back_saturation_k)) / (1.0 - e))


def stall_load(full_saturation_k: Values, back_saturation_k: Values, pivot_k: Values) -> Array:
    """Share of the full load below which condensate is held up.

    Parameters
    ----------
    full_saturation_k : array_like
        Saturation temperature in the coil at full load [K].
    back_saturation_k : array_like
        Saturation temperature at the pressure the condensate has to overcome [K].
    pivot_k : array_like
        Air-off temperature where the air-on temperature varies and the air-off is held; air-on temperature
        where the set point varies [K].

    Returns
    -------
    Array
        Load, 0 to 1: at 1 the coil is stalled even at full load.

    Notes
    -----
    The steam temperature falls in a straight line with the load to the pivot, so y = (Ts_back - T)/(Ts_0 -
    T).
    """
    pivot = np.asarray(pivot_k, dtype=np.float64)
    span = np.asarray(full_saturation_k - pivot)
    usable = span > 0.0
    load = np.asarray(back_saturation_k - pivot) / np.where(usable, span, 1.0)
    return np.where(usable, np.clip(load, 0.0, 1.0), 1.0)


def draining_head_pa(
    steam_pressure_pa: Values,
    return_pressure_pa: Values,
    liquid_density_kg_m3: Values,
    lift_m: Values = 0.0,
    leg_m: Values = 0.0,
    trap_pressure_drop_pa: Values = 0.0,
) -> Array:
    """Pressure left to drive condensate out of the coil.

    Parameters
    ----------
    steam_pressure_pa : array_like
        Pressure in the coil at the load, absolute [Pa].
    return_pressure_pa : array_like
        Pressure of the return line, absolute [Pa].
    liquid_density_kg_m3 : array_like
        Density of the condensate [kg/m3].
    lift_m, leg_m : array_like
        Rise after the trap, and drain leg above it [m].
    trap_pressure_drop_pa : array_like
        Drop the trap needs to pass the flow [Pa].

    Returns
    -------
    Array
        Pressure difference [Pa]: negative means the coil floods.

    Notes
    -----
    p_steam - p_return - dp_trap - rho g lift + rho g leg.
    """
    static = np.asarray(liquid_density_kg_m3, dtype=np.float64) * GRAVITY_M_S2 * (np.asarray(leg_m) - lift_m)
    return np.asarray(np.asarray(steam_pressure_pa) - return_pressure_pa - trap_pressure_drop_pa + static)


def return_pressure_for_head_pa(
    head_pa: Values, return_pressure_pa: Values, wanted_head_pa: Values = 10e3
) -> Array:
    """Return pressure that would leave a wanted draining head: one remedy of stall.

    Parameters
    ----------
    head_pa : array_like
        Draining head now, from `draining_head_pa` [Pa].
    return_pressure_pa : array_like
        Return pressure now, absolute [Pa].
    wanted_head_pa : array_like
        Wanted head [Pa].

    Returns
    -------
    Array
        Return pressure, absolute [Pa]; at or below 0 no return pressure will do and a pump is needed.
    """
    return np.asarray(np.asarray(return_pressure_pa, dtype=np.float64) + head_pa - wanted_head_pa)


def leg_for_head_m(
    head_pa: Values, leg_m: Values, liquid_density_kg_m3: Values, wanted_head_pa: Values = 10e3
) -> Array:
    """Drain leg above the trap that would leave a wanted draining head: another remedy of stall.

    Parameters
    ----------
    head_pa : array_like
        Draining head now, from `draining_head_pa` [Pa].
    leg_m : array_like
        Drain leg now [m].
    liquid_density_kg_m3 : array_like
        Density of the condensate [kg/m3].
    wanted_head_pa : array_like
        Wanted head [Pa].

    Returns
    -------
    Array
        Drain leg [m], at least 0. The lift after the trap may be lowered by the same difference instead.
    """
    missing = np.asarray(wanted_head_pa, dtype=np.float64) - head_pa
    return np.asarray(np.maximum(leg_m + missing / (np.asarray(liquid_density_kg_m3) * GRAVITY_M_S2), 0.0))


def steam_pressure_for_head_pa(
    head_pa: Values, steam_pressure_pa: Values, wanted_head_pa: Values = 10e3
) -> Array:
    """Coil pressure to keep for a wanted draining head (by dampers instead of throttling): a third remedy.

    Parameters
    ----------
    head_pa : array_like
        Draining head now, from `draining_head_pa` [Pa].
    steam_pressure_pa : array_like
        Pressure in the coil now, absolute [Pa].
    wanted_head_pa : array_like
        Wanted head [Pa].

    Returns
    -------
    Array
        Pressure in the coil, absolute [Pa].
    """
    return np.asarray(np.asarray(steam_pressure_pa, dtype=np.float64) + wanted_head_pa - head_pa)


def front_fed_share(
    last_over_first: Values, inlet_loss_first: Values = 0.0, inlet_loss_last: Values = 0.0
) -> Array:
    """Share of the first row's steam that comes from the front; the rest flows back from the outlet header.

    Parameters
    ----------
    last_over_first : array_like
        Condensate of the row that condenses least over that of the row that condenses most, 0 to 1.
    inlet_loss_first, inlet_loss_last : array_like
        Loss of an inlet orifice of either row over the row's own friction with the same inlet flow (0
        without).

    Returns
    -------
    Array
        Share x from 0.5 to 1 without orifices; 1 where nothing flows back.

    Notes
    -----
    Rows between common headers, uniform condensation, friction as the square of the flow; the flow falls
    along a row in a straight line, so its friction is a third of that with the inlet flow. Equal drops of
    first and last row give k1 x^2 + x^3 - (1 - x)^3 = (1 + kN) (wN/w1)^2. Without orifices x = 1/2 +
    sinh(arcsinh(2 r^2)/3). Equal orifices on all rows do not stop the back-flow (x tends to r); only ones
    sized row by row do: `row_orifice_loss`.
    """
    ratio, first, last = np.broadcast_arrays(
        np.clip(np.asarray(last_over_first, dtype=np.float64), 0.0, 1.0),
        np.maximum(np.asarray(inlet_loss_first, dtype=np.float64), 0.0),
        np.maximum(np.asarray(inlet_loss_last, dtype=np.float64), 0.0),
    )
    drop = (1.0 + last) * ratio**2
    low, high = np.zeros(ratio.shape), np.ones(ratio.shape)
    for _ in range(56):
        x = 0.5 * (low + high)
        more = first * x**2 + x**3 - (1.0 - x) ** 3 < drop
        low, high = np.where(more, x, low), np.where(more, high, x)
    return np.asarray(high)


def row_orifice_loss(row_over_first: Values, friction_heads: Values) -> Array:
    """Loss of the inlet orifice of a rear row that ends the back-flow into the first row: the remedy.

    Parameters
    ----------
    row_over_first : array_like
        Condensate of the row over that of the row that condenses most, above 0 to 1.
    friction_heads : array_like
        Friction f L/D of a tube with its inlet flow, in velocity heads.

    Returns
    -------
    Array
        Loss of the orifice in velocity heads of the tube's inlet; the first row carries none.

    Notes
    -----
    Equal drops with every row fed from the front: (xi + f L/(3 D)) w^2 = f L/(3 D) w1^2.
    """
    ratio = np.clip(np.asarray(row_over_first, dtype=np.float64), 1e-3, 1.0)
    return np.asarray(np.asarray(friction_heads) / 3.0 * (1.0 / ratio**2 - 1.0))


def least_over_most(row_condensate_kg_s: Values) -> Array:
    """Condensate of the row that condenses least over that of the row that condenses most.

    Parameters
    ----------
    row_condensate_kg_s : array_like
        Condensate of one tube of each row, rows on the last axis [kg/s].

    Returns
    -------
    Array
        Ratio, shape without the last axis; 1 where nothing condenses.
    """
    flow = np.asarray(row_condensate_kg_s, dtype=np.float64)
    most, least = flow.max(axis=-1), flow.min(axis=-1)
    return np.where(most > 0.0, least / np.where(most > 0.0, most, 1.0), 1.0)


def grade_back_flow(last_over_first: Values, cured: Answers, lowest_air_k: Values, rows: Values) -> Codes:
    """Grade the back-flow between rows.

    Parameters
    ----------
    last_over_first : array_like
        Ratio from `least_over_most`.
    cured : array_like
        YES for separate traps or orifices sized row by row, NO for shared headers, UNKNOWN where not stated.
    lowest_air_k : array_like
        Lowest air-on temperature [K].
    rows : array_like
        Rows that share the headers.

    Returns
    -------
    Codes
        Index into the verdict words.

    Notes
    -----
    0.9 within, 0.7 near, beyond below; one step worse with air on below +2 C (a rule of this service). Not
    stated is unassessed, unless even shared headers would be within.
    """
    shared = BACK_FLOW.grade(last_over_first)
    cold = np.asarray(lowest_air_k, dtype=np.float64) < AIR_ON_SAFE_K
    graded = shared != UNASSESSED
    shared = np.where(graded & cold, np.minimum(shared + 1, BEYOND), shared)
    unsure = (np.asarray(cured) == UNKNOWN) & (shared != WITHIN)
    fine = (np.asarray(cured) == YES) | (np.asarray(rows) <= 1)
    return np.where(fine, WITHIN, np.where(unsure, UNASSESSED, shared)).astype(np.int8)


def grade_slope(slope: Values, sag_slope: Values = 0.0) -> Codes:
    """Grade the pitch of horizontal tubes for drainage.

    Parameters
    ----------
    slope : array_like
        Pitch of the tubes towards the outlet [m/m].
    sag_slope : array_like
        Greatest slope of the sag between supports [m/m].

    Returns
    -------
    Codes
        Index into the verdict words.

    Notes
    -----
    1:100 within, 1:250 near (common practice, no source), and either more than the sag's slope, or pools
    stand.
    """
    pitch, sag = np.asarray(slope, dtype=np.float64), np.asarray(sag_slope, dtype=np.float64)
    return grade(pitch, np.maximum(sag, 1.0 / 250.0), np.maximum(sag, 1.0 / 100.0), sense="at-least")


_SCALD = (
    "Held-up condensate hammers and scalds; isolate and vent before opening. "
    "Water above 60 C scalds within seconds."
)

HEAD = Criterion(
    slug="draining-head",
    check="condensate-return",
    quantity="pressure left to drive condensate out",
    unit="Pa",
    sense="at-least",
    beyond=0.0,
    near=10e3,
    source="common practice, no source",
    trust="practice",
    needs=("return pressure", "lift", "states"),
    caution=_SCALD,
)
BACK_FLOW = Criterion(
    slug="common-header-back-flow",
    check="row-backflow",
    quantity="condensate of the last row over that of the first",
    unit="",
    sense="at-least",
    beyond=0.7,
    near=0.9,
    source="rows between common headers, friction as the flow squared; limits a rule of this service",
    trust="own",
    needs=("header and trap arrangement",),
    caution="Where steam holds more than 0.1 % of gas by mass, vent the rear header all the time.",
)
CRITERIA = (HEAD, BACK_FLOW)
