"""Banks of tubes through continuous flat plate fins: Wang, Chi & Chang 2000.

Nusselt and Reynolds numbers are on the collar diameter (tube and twice the plate's thickness), the velocity
is that of the narrowest section between collars and plates. Wavy and louvred plates are beyond this law.
"""

import numpy as np

from crossbank_service.methods._blend import elementwise, log_reynolds
from crossbank_service.methods._finned import PLATE_INPUTS, plate_cell
from crossbank_service.methods.record import Array, DerivedLimit, Limit, Method

# The published Reynolds range of Wang, Chi & Chang; beyond it their curves go on as straight lines in ln-ln.
_WANG_REYNOLDS = (300.0, 2e4)
_WANG_MOST_ROWS = 6.0
# Where pitches make the exponents absurd, ln j and ln f end here: out of range, but numbers.
_LEAST_LOGARITHM, _MOST_LOGARITHM = -40.0, 40.0


def _beyond(ln_re: Array) -> tuple[Array, Array]:
    """Return ln Re held in the published range, and how far it lies beyond."""
    held = np.clip(ln_re, np.log(_WANG_REYNOLDS[0]), np.log(_WANG_REYNOLDS[1]))
    return held, ln_re - held


def _held(logarithm: Array) -> Array:
    """Logarithm kept where its exponential is an ordinary number."""
    return np.clip(logarithm, _LEAST_LOGARITHM, _MOST_LOGARITHM)


@elementwise
def wang_chi_chang_2000(
    *,
    reynolds: Array,
    prandtl: Array,
    rows: Array,
    diameter_m: Array,
    fin_thickness_m: Array,
    fin_pitch_m: Array,
    transverse_pitch_m: Array,
    longitudinal_pitch_m: Array,
) -> Array:
    """Mean Nusselt number of a staggered bank in flat plates after Wang, Chi & Chang 2000.

    Parameters
    ----------
    reynolds, prandtl : Array
        Re in the narrowest section on the collar diameter, Pr of the bulk [-].
    rows : Array
        Rows N along the stream; more than 6 count as 6 [-].
    diameter_m : Array
        Collar diameter D_c [m].
    fin_thickness_m, fin_pitch_m : Array
        Plate thickness t and pitch F_p [m].
    transverse_pitch_m, longitudinal_pitch_m : Array
        Tube pitches P_t and P_l [m].

    Returns
    -------
    Array
        Nu = j Re Pr^(1/3) on the collar diameter [-].

    Notes
    -----
    One row j = 0.108 Re^-0.29 (P_t/P_l)^P1 (F_p/D_c)^-1.084 (F_p/D_h)^-0.786 (F_p/P_t)^P2, more rows j =
    0.086 Re^P3 N^P4 (F_p/D_c)^P5 (F_p/D_h)^P6 (F_p/P_t)^-0.93; exponents in ln Re, D_h = 4 A_c L/A (C.-C.
    Wang, K.-Y. Chi & C.-J. Chang, Int. J. Heat Mass Transfer 43 (2000) 2693-2700). Re 300 to 2e4; beyond, j
    goes on with the slope it has at the end (own choice: the exponents themselves diverge).
    """
    n = np.minimum(rows, _WANG_MOST_ROWS)
    fin, collar, section = plate_cell(
        arrangement=1.0,
        rows=n,
        diameter=diameter_m,
        thickness=fin_thickness_m,
        pitch=fin_pitch_m,
        transverse=transverse_pitch_m,
        longitudinal=longitudinal_pitch_m,
    )
    hydraulic = 4.0 * section * longitudinal_pitch_m / (fin + collar)
    ln_re = log_reynolds(reynolds)
    held, beyond = _beyond(ln_re)
    ln_pitches = np.log(transverse_pitch_m / longitudinal_pitch_m)
    ln_collar = np.log(fin_pitch_m / diameter_m)
    ln_hydraulic = np.log(fin_pitch_m / hydraulic)
    ln_across = np.log(fin_pitch_m / transverse_pitch_m)

    one = (
        np.log(0.108)
        - 0.29 * held
        + (1.9 - 0.23 * held) * ln_pitches
        - 1.084 * ln_collar
        - 0.786 * ln_hydraulic
        + (-0.236 + 0.126 * held) * ln_across
    )
    one_slope = -0.29 - 0.23 * ln_pitches + 0.126 * ln_across

    ln_n = np.log(n)
    depth = 0.076 * (longitudinal_pitch_m / hydraulic) ** 1.42
    p3 = -0.361 - 0.042 * n / held + 0.158 * (ln_n + 0.41 * ln_collar)
    p4 = -1.224 - depth / held
    p5 = -0.083 + 0.058 * n / held
    p6 = -5.735 + 1.21 * (held - ln_n)
    many = np.log(0.086) + p3 * held + p4 * ln_n + p5 * ln_collar + p6 * ln_hydraulic - 0.93 * ln_across
    many_slope = (
        -0.361
        + 0.158 * (ln_n + 0.41 * ln_collar)
        + 1.21 * ln_hydraulic
        + (depth * ln_n - 0.058 * n * ln_collar) / held**2
    )

    single = n < 1.5
    ln_j = np.where(single, one, many) + np.where(single, one_slope, many_slope) * beyond
    return np.exp(_held(ln_j) + ln_re) * np.cbrt(prandtl)


@elementwise
def wang_chi_chang_2000_drop(
    *,
    reynolds: Array,
    rows: Array,
    diameter_m: Array,
    fin_thickness_m: Array,
    fin_pitch_m: Array,
    transverse_pitch_m: Array,
    longitudinal_pitch_m: Array,
) -> Array:
    """Loss of one row of a staggered bank in flat plates after Wang, Chi & Chang 2000.

    Parameters
    ----------
    reynolds : Array
        Re in the narrowest section on the collar diameter [-].
    rows : Array
        Rows N along the stream; the law takes more than 6 as 6 [-].
    diameter_m : Array
        Collar diameter D_c [m].
    fin_thickness_m, fin_pitch_m : Array
        Plate thickness and pitch F_p [m].
    transverse_pitch_m, longitudinal_pitch_m : Array
        Tube pitches P_t and P_l [m].

    Returns
    -------
    Array
        f A/(A_c N), velocity heads of the narrowest section per row [-].

    Notes
    -----
    f = 0.0267 Re^F1 (P_t/P_l)^F2 (F_p/D_c)^F3, exponents in 1/ln Re, in dp = f (A/A_c) G^2/(2 rho),
    entrance and exit included (Wang, Chi & Chang 2000). The source's momentum term is left out: momentum is
    added duct to duct. Re 300 to 2e4; beyond, f goes on with the slope it has at the end.
    """
    fin, collar, section = plate_cell(
        arrangement=1.0,
        rows=rows,
        diameter=diameter_m,
        thickness=fin_thickness_m,
        pitch=fin_pitch_m,
        transverse=transverse_pitch_m,
        longitudinal=longitudinal_pitch_m,
    )
    held, beyond = _beyond(log_reynolds(reynolds))
    quotient = transverse_pitch_m / longitudinal_pitch_m
    ln_pitches = np.log(quotient)
    closeness = fin_pitch_m / diameter_m
    ln_collar = np.log(closeness)
    n = np.minimum(rows, _WANG_MOST_ROWS)
    f1 = -0.764 + 0.739 * quotient + 0.177 * closeness - 0.00758 / n
    f2 = -15.689 + 64.021 / held
    f3 = 1.696 - 15.695 / held
    ln_f = np.log(0.0267) + f1 * held + f2 * ln_pitches + f3 * ln_collar
    slope = f1 + (15.695 * ln_collar - 64.021 * ln_pitches) / held**2
    return np.exp(_held(ln_f + slope * beyond)) * (fin + collar) / section


@elementwise
def _pitch_quotient(*, transverse_pitch_m: Array, longitudinal_pitch_m: Array, **_others: Array) -> Array:
    return transverse_pitch_m / longitudinal_pitch_m


_WANG_LIMITS = (
    Limit(quantity="reynolds", at_least=_WANG_REYNOLDS[0], at_most=_WANG_REYNOLDS[1]),
    Limit(quantity="rows", at_least=1.0, at_most=_WANG_MOST_ROWS),
    Limit(quantity="diameter_m", at_least=0.00635, at_most=0.0127),
    Limit(quantity="fin_pitch_m", at_least=0.00119, at_most=0.0087),
    Limit(quantity="transverse_pitch_m", at_least=0.0177, at_most=0.03175),
    Limit(quantity="longitudinal_pitch_m", at_least=0.0124, at_most=0.0275),
)
_WANG_DERIVED = (
    DerivedLimit(name="transverse over longitudinal pitch", value=_pitch_quotient, at_most=1.35),
)
_WANG_SOURCE = (
    "C.-C. Wang, K.-Y. Chi & C.-J. Chang, Heat transfer and friction characteristics of plain "
    "fin-and-tube heat exchangers, part II: correlation, Int. J. Heat Mass Transfer 43 (2000) 2693-2700"
)
_WANG_NOTE = (
    "Flat plates, staggered tubes; Reynolds number on the collar. More than 6 rows take the exponents of 6; "
    "beyond Re 300 to 2e4 the curve goes on with the slope it has there."
)
_WANG_DOUBT = "Exponents of exponents: far outside its data, in pitches above all, it is of no use."

WANG_CHI_CHANG_2000 = Method(
    slug="wang-chi-chang-2000",
    role="outside_heat_transfer",
    surfaces=("plate",),
    arrangements=("staggered",),
    gives="nusselt",
    function=wang_chi_chang_2000,
    inputs=("reynolds", "prandtl", "rows", *PLATE_INPUTS),
    limits=_WANG_LIMITS,
    derived_limits=_WANG_DERIVED,
    source=_WANG_SOURCE,
    doubt=_WANG_DOUBT,
    note=f"{_WANG_NOTE} 89 % of the data lie within 15 %.",
    scatter_fraction=0.15,
    standard_uncertainty_fraction=0.09,
)

WANG_CHI_CHANG_2000_DROP = Method(
    slug="wang-chi-chang-2000",
    role="outside_pressure_drop",
    surfaces=("plate",),
    arrangements=("staggered",),
    gives="loss_coefficient",
    function=wang_chi_chang_2000_drop,
    inputs=("reynolds", "rows", *PLATE_INPUTS),
    limits=_WANG_LIMITS,
    derived_limits=_WANG_DERIVED,
    source=_WANG_SOURCE,
    doubt=_WANG_DOUBT,
    note=(
        f"{_WANG_NOTE} 85 % of the data lie within 15 %. The source's momentum term is left out: the "
        "change of momentum by heating or cooling is added duct to duct."
    ),
    scatter_fraction=0.15,
    standard_uncertainty_fraction=0.10,
)

RECORDS = (WANG_CHI_CHANG_2000, WANG_CHI_CHANG_2000_DROP)
