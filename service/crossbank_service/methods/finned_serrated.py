"""Banks of tubes with welded fins, solid or serrated, after Weierman 1976: heat transfer and pressure drop.

Two sets of the first two constants exist. Staggered banks take the revised set, in-line banks that of 1976.
The j factor was reduced with Weierman's own fin efficiency and goes only with
``fin_efficiency.weierman_solid_efficiency`` and ``weierman_serrated_efficiency``.
"""

import numpy as np
from numpy.typing import NDArray

from crossbank_service.methods._blend import elementwise, log_reynolds
from crossbank_service.methods._finned import FIN_INPUTS, LEAST_FIN_HEIGHT, PITCHES, gap_over_height
from crossbank_service.methods._layout import is_staggered
from crossbank_service.methods.record import Array, Limit, Method


def _temperature_ratio(gas_temperature_k: Array | None, fin_temperature_k: Array | None) -> Array | float:
    """T_g/T_f, 1 where either is not given."""
    if gas_temperature_k is None or fin_temperature_k is None:
        return 1.0
    return gas_temperature_k / fin_temperature_k


def _serrated(segment_width_m: Array | None) -> NDArray[np.bool_]:
    """Say where the fin is cut into segments."""
    return np.asarray(False if segment_width_m is None else segment_width_m > 0.0)


def _crowding(fin_height_m: Array, fin_thickness_m: Array, fin_pitch_m: Array) -> Array:
    """Fin height over clear gap, h/s [-]."""
    return 1.0 / gap_over_height(np.maximum(fin_height_m, LEAST_FIN_HEIGHT), fin_thickness_m, fin_pitch_m)


def _c3(crowding: Array, staggered: NDArray[np.bool_], serrated: NDArray[np.bool_]) -> Array:
    """Factor of the fins in j, by kind of fin and arrangement."""
    solid = np.exp(-0.25 * crowding)
    cut = np.exp(-0.35 * crowding)
    return np.where(
        serrated,
        np.where(staggered, 0.55 + 0.45 * cut, 0.35 + 0.50 * cut),
        np.where(staggered, 0.35 + 0.65 * solid, 0.20 + 0.65 * solid),
    )


def _c4(
    crowding: Array, pitch_ratio: Array, staggered: NDArray[np.bool_], serrated: NDArray[np.bool_]
) -> Array:
    """Factor of fins and transverse pitch in f, by kind of fin and arrangement."""
    exponent = np.where(
        serrated,
        np.where(staggered, 0.7 * crowding**0.23, 1.1 * crowding**0.20),
        np.where(staggered, 0.7 * crowding**0.20, 1.1 * crowding**0.15),
    )
    # tubes cannot stand closer than they are wide
    spread: Array = np.where(staggered, 0.05, 0.15) * np.maximum(pitch_ratio, 1.0)
    factor: Array = np.where(staggered, 0.11, 0.08) * spread**-exponent
    return factor


def _c5(quotient: Array, rows: Array, staggered: NDArray[np.bool_]) -> Array:
    """Factor of rows and layout in j; one row has no layout and takes the staggered form."""
    triangular = 0.7 + (0.70 - 0.8 * np.exp(-0.15 * rows**2)) * np.exp(-quotient)
    square = 1.1 - (0.75 - 1.5 * np.exp(-0.7 * rows)) * np.exp(-2.0 * quotient)
    return np.where(staggered | (rows < 1.5), triangular, square)


def _c6(quotient: Array, rows: Array, staggered: NDArray[np.bool_]) -> Array:
    """Factor of rows and layout in f; one row has no layout and takes the staggered form."""
    few = np.exp(-0.15 * rows**2)
    triangular = (
        1.1 + (1.8 - 2.1 * few) * np.exp(-2.0 * quotient) - (0.7 - 0.8 * few) * np.exp(-0.6 * quotient)
    )
    square = 1.6 - (0.75 - 1.5 * np.exp(-0.7 * rows)) * np.exp(-0.20 * quotient**2)
    return np.where(staggered | (rows < 1.5), triangular, square)


@elementwise
def weierman_1976(
    *,
    reynolds: Array,
    prandtl: Array,
    arrangement: Array,
    rows: Array,
    diameter_m: Array,
    fin_height_m: Array,
    fin_thickness_m: Array,
    fin_pitch_m: Array,
    transverse_pitch_m: Array,
    longitudinal_pitch_m: Array,
    segment_width_m: Array | None = None,
    gas_temperature_k: Array | None = None,
    fin_temperature_k: Array | None = None,
) -> Array:
    """Mean Nusselt number of a bank with solid or serrated welded fins after Weierman.

    Parameters
    ----------
    reynolds, prandtl : Array
        Re in the narrowest section on the root diameter, Pr of the bulk [-].
    arrangement : Array
        1 for staggered, 0 for in-line.
    rows : Array
        Rows along the stream [-].
    diameter_m : Array
        Root diameter d [m].
    fin_height_m, fin_thickness_m, fin_pitch_m : Array
        Fin height h, thickness and pitch [m].
    transverse_pitch_m, longitudinal_pitch_m : Array
        Tube pitches P_t and P_l [m].
    segment_width_m : Array, optional
        Width of a fin segment [m]; 0 or left out: a solid fin.
    gas_temperature_k, fin_temperature_k : Array, optional
        Mean temperatures of stream and fin [K]; either left out: no correction.

    Returns
    -------
    Array
        Nu = j Re Pr^(1/3) on the root diameter [-].

    Notes
    -----
    Staggered j = C1 C3 C5 (d_f/d)^0.5 (T_g/T_f)^0.25 with the revised C1 = 0.091 Re^-0.25; in-line j = C1
    C3 C5 (d_f/d)^0.5 (T_g/T_f)^0.5 with C1 = 0.25 Re^-0.35 of 1976. C3 from h/s, C5 from P_l/P_t and rows
    (C. Weierman, Oil & Gas J. 74 (1976) no. 36, 94-100; the revised set in V. Ganapathy, Industrial Boilers
    and Heat Recovery Steam Generators, 2003). Re 2e3 to 5e5.
    """
    staggered = is_staggered(arrangement)
    ln_re = log_reynolds(reynolds)
    c1 = np.where(staggered, 0.091 * np.exp(-0.25 * ln_re), 0.25 * np.exp(-0.35 * ln_re))
    c3 = _c3(_crowding(fin_height_m, fin_thickness_m, fin_pitch_m), staggered, _serrated(segment_width_m))
    c5 = _c5(longitudinal_pitch_m / transverse_pitch_m, rows, staggered)
    tip = np.sqrt(1.0 + 2.0 * fin_height_m / diameter_m)
    warmth = _temperature_ratio(gas_temperature_k, fin_temperature_k) ** np.where(staggered, 0.25, 0.5)
    return c1 * c3 * c5 * tip * warmth * np.exp(ln_re) * np.cbrt(prandtl)


@elementwise
def weierman_1976_drop(
    *,
    reynolds: Array,
    arrangement: Array,
    rows: Array,
    diameter_m: Array,
    fin_height_m: Array,
    fin_thickness_m: Array,
    fin_pitch_m: Array,
    transverse_pitch_m: Array,
    longitudinal_pitch_m: Array,
    segment_width_m: Array | None = None,
    gas_temperature_k: Array | None = None,
    fin_temperature_k: Array | None = None,
) -> Array:
    """Loss of one row of a bank with solid or serrated welded fins after Weierman.

    Parameters
    ----------
    reynolds : Array
        Re in the narrowest section on the root diameter [-].
    arrangement : Array
        1 for staggered, 0 for in-line.
    rows : Array
        Rows along the stream [-].
    diameter_m : Array
        Root diameter d [m].
    fin_height_m, fin_thickness_m, fin_pitch_m : Array
        Fin height h, thickness and pitch [m].
    transverse_pitch_m, longitudinal_pitch_m : Array
        Tube pitches P_t and P_l [m].
    segment_width_m : Array, optional
        Width of a fin segment [m]; 0 or left out: a solid fin.
    gas_temperature_k, fin_temperature_k : Array, optional
        Mean temperatures of stream and fin [K]; either left out: no correction.

    Returns
    -------
    Array
        4 f, velocity heads of the narrowest section per row [-].

    Notes
    -----
    dp = 4 (f + a) N G^2/(2 rho). Staggered f = C2 C4 C6 (d_f/d)^0.5 (T_g/T_f)^-0.25 with the revised C2 =
    0.075 + 1.85 Re^-0.3; in-line f = C2 C4 C6 d_f/d with C2 = 0.07 + 8 Re^-0.45 of 1976 and exp(-0.2
    (P_l/P_t)^2) in C6 (Weierman 1976; Ganapathy 2003). The source's a is a momentum term on the narrowest
    section; it is left out here, since momentum is added duct to duct with the empty duct's mass flux.
    """
    staggered = is_staggered(arrangement)
    ln_re = log_reynolds(reynolds)
    c2 = np.where(staggered, 0.075 + 1.85 * np.exp(-0.3 * ln_re), 0.07 + 8.0 * np.exp(-0.45 * ln_re))
    crowding = _crowding(fin_height_m, fin_thickness_m, fin_pitch_m)
    c4 = _c4(crowding, transverse_pitch_m / diameter_m, staggered, _serrated(segment_width_m))
    c6 = _c6(longitudinal_pitch_m / transverse_pitch_m, rows, staggered)
    tip = 1.0 + 2.0 * fin_height_m / diameter_m
    warmth = _temperature_ratio(gas_temperature_k, fin_temperature_k) ** np.where(staggered, -0.25, 0.0)
    return 4.0 * c2 * c4 * c6 * np.where(staggered, np.sqrt(tip), tip) * warmth


_LIMITS = (
    Limit(quantity="reynolds", at_least=2e3, at_most=5e5),
    Limit(quantity="diameter_m", at_least=0.025, at_most=0.1),
    Limit(quantity="fin_height_m", at_least=0.009, at_most=0.038),
    Limit(quantity="fin_pitch_m", at_least=0.0254 / 8.0, at_most=0.0254),
)
_OPTIONS = ("segment_width_m", "gas_temperature_k", "fin_temperature_k")
_SOURCE = (
    "C. Weierman, Correlations ease the selection of finned tubes, Oil & Gas J. 74 (1976) no. 36, "
    "94-100; revised constants in V. Ganapathy, Industrial Boilers and Heat Recovery Steam Generators, "
    "Marcel Dekker 2003"
)
_SETS = (
    "Staggered banks with the revised first constants (1993), in-line banks with those of 1976. A "
    "segment width makes the fin serrated; without one it is solid. One row takes the staggered layout "
    "factors."
)

WEIERMAN_1976 = Method(
    slug="weierman-1976",
    role="outside_heat_transfer",
    surfaces=("annular", "serrated"),
    arrangements=("inline", "staggered"),
    gives="nusselt",
    function=weierman_1976,
    inputs=("reynolds", "prandtl", "arrangement", "rows", *FIN_INPUTS, *PITCHES),
    options=_OPTIONS,
    limits=_LIMITS,
    source=_SOURCE,
    doubt=(
        "The limits are quoted from memory. Against the mean of Briggs & Young, ESDU and Ganguli the "
        "staggered set gives 0.92-0.95, 1.04-1.08, 1.16-1.21 at Re 3e3, 1e4, 3e4; in-line it lies 1.2 to "
        "1.5 times above Schmidt and Ganguli at Re 1e4: an upper bound, to be read as +-30 %."
    ),
    note=f"{_SETS} Goes with Weierman's own fin efficiency, which its data were reduced with.",
    scatter_fraction=0.10,
    standard_uncertainty_fraction=0.09,
)

WEIERMAN_1976_DROP = Method(
    slug="weierman-1976",
    role="outside_pressure_drop",
    surfaces=("annular", "serrated"),
    arrangements=("inline", "staggered"),
    gives="loss_coefficient",
    function=weierman_1976_drop,
    inputs=("reynolds", "arrangement", "rows", *FIN_INPUTS, *PITCHES),
    options=_OPTIONS,
    limits=_LIMITS,
    source=_SOURCE,
    doubt=(
        "The limits are quoted from memory. In-line prints differ in the exponent of C6 (-0.2 or -2.0 "
        "times the squared pitch ratio); -0.2 is the one that gives 1 for the square reference bank. "
        "In-line to be read as -15/+35 %."
    ),
    note=(
        f"{_SETS} The source's momentum term is left out: the change of momentum by heating or cooling is "
        "added duct to duct."
    ),
    scatter_fraction=0.15,
    standard_uncertainty_fraction=0.12,
)

RECORDS = (WEIERMAN_1976, WEIERMAN_1976_DROP)
