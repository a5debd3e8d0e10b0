"""Banks of tubes through continuous flat plate fins: Wang, Chi & Chang 2000 and Gray & Webb 1986.

Nusselt and Reynolds numbers are on the collar diameter (tube and twice the plate's thickness), the velocity
is that of the narrowest section between collars and plates. Wavy and louvred plates are beyond these laws.
"""

import numpy as np

from crossbank_service.methods._blend import elementwise, log_reynolds
from crossbank_service.methods._finned import PITCHES
from crossbank_service.methods._layout import is_staggered
from crossbank_service.methods.fin_surfaces import fin_gap, free_width, plate_areas
from crossbank_service.methods.outside_plain_older import jakob_1938
from crossbank_service.methods.record import Array, DerivedLimit, Limit, Method

# The published Reynolds range of Wang, Chi & Chang; beyond it their curves go on as straight lines in ln-ln.
_WANG_REYNOLDS = (300.0, 2e4)
_WANG_MOST_ROWS = 6.0
# Where pitches make the exponents absurd, ln j and ln f end here: out of range, but numbers.
_LEAST_LOGARITHM, _MOST_LOGARITHM = -40.0, 40.0
# In-line plates have no law of their own: staggered ones reduced by these (engineering judgement).
_INLINE_HEAT = 0.7
_INLINE_DROP = 0.6


def _cell(
    *,
    arrangement: Array | float,
    rows: Array,
    diameter: Array,
    thickness: Array,
    pitch: Array,
    transverse: Array,
    longitudinal: Array,
) -> tuple[Array, Array, Array]:
    """Fin surface, collar surface and narrowest section of one tube, per metre of it [m2/m]."""
    fin, collar = plate_areas(
        diameter_m=diameter,
        fin_thickness_m=thickness,
        fin_pitch_m=pitch,
        transverse_pitch_m=transverse,
        longitudinal_pitch_m=longitudinal,
        rows=rows,
    )
    width = free_width(
        arrangement=arrangement,
        transverse_pitch_m=transverse,
        longitudinal_pitch_m=longitudinal,
        blocked_width_m=diameter,
        rows=rows,
    )
    return fin, collar, width * fin_gap(fin_pitch_m=pitch, fin_thickness_m=thickness) / pitch


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
    fin, collar, section = _cell(
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
    fin, collar, section = _cell(
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
def gray_webb_1986(
    *,
    reynolds: Array,
    prandtl: Array,
    arrangement: Array,
    rows: Array,
    diameter_m: Array,
    fin_thickness_m: Array,
    fin_pitch_m: Array,
    transverse_pitch_m: Array,
    longitudinal_pitch_m: Array,
) -> Array:
    """Mean Nusselt number of a bank in flat plates after Gray & Webb 1986.

    Parameters
    ----------
    reynolds, prandtl : Array
        Re in the narrowest section on the collar diameter, Pr of the bulk [-].
    arrangement : Array
        1 for staggered, 0 for in-line.
    rows : Array
        Rows N along the stream [-].
    diameter_m : Array
        Collar diameter D [m].
    fin_thickness_m, fin_pitch_m : Array
        Plate thickness and pitch; s is the gap between plates [m].
    transverse_pitch_m, longitudinal_pitch_m : Array
        Tube pitches P_t and P_l [m].

    Returns
    -------
    Array
        Nu = j Re Pr^(1/3) on the collar diameter [-].

    Notes
    -----
    Four rows and more j_4 = 0.14 Re^-0.328 (P_t/P_l)^-0.502 (s/D)^0.0312; fewer j = j_4 0.991 [2.24
    Re^-0.092 (N/4)^-0.031]^(0.607 (4 - N)) (D. L. Gray & R. L. Webb, Proc. 8th Int. Heat Transfer Conf.
    (1986) 6, 2745-2750). Re 500 to 2.47e4. In-line banks: 0.7 of it, engineering judgement.
    """
    ln_re = log_reynolds(reynolds)
    gap = fin_gap(fin_pitch_m=fin_pitch_m, fin_thickness_m=fin_thickness_m)
    ln_j = (
        np.log(0.14)
        - 0.328 * ln_re
        - 0.502 * np.log(transverse_pitch_m / longitudinal_pitch_m)
        + 0.0312 * np.log(gap / diameter_m)
    )
    # the factor of shallow banks does not reach 1 at four rows (0.991), as printed
    missing = np.maximum(4.0 - rows, 0.0)
    per_row = np.log(2.24) - 0.092 * ln_re - 0.031 * np.log(0.25 * np.minimum(rows, 4.0))
    shallow = np.where(rows < 4.0, np.log(0.991) + 0.607 * missing * per_row, 0.0)
    share = np.where(is_staggered(arrangement), 1.0, _INLINE_HEAT)
    nusselt: Array = share * np.exp(ln_j + shallow + ln_re) * np.cbrt(prandtl)
    return nusselt


@elementwise
def gray_webb_1986_drop(
    *,
    reynolds: Array,
    arrangement: Array,
    rows: Array,
    diameter_m: Array,
    fin_thickness_m: Array,
    fin_pitch_m: Array,
    transverse_pitch_m: Array,
    longitudinal_pitch_m: Array,
) -> Array:
    """Loss of one row of a bank in flat plates after Gray & Webb 1986.

    Parameters
    ----------
    reynolds : Array
        Re in the narrowest section on the collar diameter [-].
    arrangement : Array
        1 for staggered, 0 for in-line.
    rows : Array
        Rows N along the stream [-].
    diameter_m : Array
        Collar diameter D [m].
    fin_thickness_m, fin_pitch_m : Array
        Plate thickness t and pitch F_p [m].
    transverse_pitch_m, longitudinal_pitch_m : Array
        Tube pitches P_t and P_l [m].

    Returns
    -------
    Array
        f A/(A_c N), velocity heads of the narrowest section per row [-].

    Notes
    -----
    f A/A_c = f_f A_f/A_c + N Eu (1 - t/F_p), f_f = 0.508 Re^-0.521 (P_t/D)^1.318 for the plates (Gray &
    Webb 1986), Eu for a row of the bare bank, Jakob (1938) as in Kim, Youn & Webb, J. Heat Transfer 121
    (1999) 662-667, whose tube part this is. The source's momentum term is left out: momentum is added duct
    to duct. Re 500 to 2.47e4. In-line banks: 0.6 of it, engineering judgement.
    """
    fin, _, section = _cell(
        arrangement=arrangement,
        rows=rows,
        diameter=diameter_m,
        thickness=fin_thickness_m,
        pitch=fin_pitch_m,
        transverse=transverse_pitch_m,
        longitudinal=longitudinal_pitch_m,
    )
    pitch_ratio = transverse_pitch_m / diameter_m
    plates = 0.508 * np.exp(-0.521 * log_reynolds(reynolds)) * pitch_ratio**1.318 * fin / section
    open_share = fin_gap(fin_pitch_m=fin_pitch_m, fin_thickness_m=fin_thickness_m) / fin_pitch_m
    share = np.where(is_staggered(arrangement), 1.0, _INLINE_DROP)
    # staggered for both arrangements, since the share stands for what in-line tubes have less; the
    # staggered law does not know the longitudinal pitch, whatever ratio it is handed
    bare = jakob_1938(
        reynolds=reynolds,
        transverse_pitch_ratio=pitch_ratio,
        longitudinal_pitch_ratio=1.5,
        arrangement=1.0,
    )
    return share * (plates + bare * open_share)


@elementwise
def _pitch_quotient(*, transverse_pitch_m: Array, longitudinal_pitch_m: Array, **_others: Array) -> Array:
    return transverse_pitch_m / longitudinal_pitch_m


@elementwise
def _transverse_ratio(*, transverse_pitch_m: Array, diameter_m: Array, **_others: Array) -> Array:
    return transverse_pitch_m / diameter_m


@elementwise
def _longitudinal_ratio(*, longitudinal_pitch_m: Array, diameter_m: Array, **_others: Array) -> Array:
    return longitudinal_pitch_m / diameter_m


@elementwise
def _gap_ratio(*, fin_pitch_m: Array, fin_thickness_m: Array, diameter_m: Array, **_others: Array) -> Array:
    return fin_gap(fin_pitch_m=fin_pitch_m, fin_thickness_m=fin_thickness_m) / diameter_m


_PLATE_INPUTS = ("diameter_m", "fin_thickness_m", "fin_pitch_m", *PITCHES)

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
_GRAY_LIMITS = (
    Limit(quantity="reynolds", at_least=500.0, at_most=2.47e4),
    Limit(quantity="rows", at_least=1.0, at_most=8.0),
)
_GRAY_DERIVED = (
    DerivedLimit(
        name="transverse pitch over collar diameter", value=_transverse_ratio, at_least=1.97, at_most=2.55
    ),
    DerivedLimit(
        name="longitudinal pitch over collar diameter", value=_longitudinal_ratio, at_least=1.7, at_most=2.58
    ),
    DerivedLimit(name="plate gap over collar diameter", value=_gap_ratio, at_least=0.08, at_most=0.64),
)
_GRAY_SOURCE = (
    "D. L. Gray & R. L. Webb, Heat transfer and friction correlations for plate finned-tube heat "
    "exchangers having plain fins, Proc. 8th Int. Heat Transfer Conf., San Francisco 1986, 6, 2745-2750"
)
_GRAY_DOUBT = (
    "In-line tubes in plates have no good open correlation: the staggered law times 0.7 (heat transfer) "
    "and 0.6 (pressure drop) by engineering judgement, indicative only."
)

WANG_CHI_CHANG_2000 = Method(
    slug="wang-chi-chang-2000",
    role="outside_heat_transfer",
    surfaces=("plate",),
    arrangements=("staggered",),
    gives="nusselt",
    function=wang_chi_chang_2000,
    inputs=("reynolds", "prandtl", "rows", *_PLATE_INPUTS),
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
    inputs=("reynolds", "rows", *_PLATE_INPUTS),
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

GRAY_WEBB_1986 = Method(
    slug="gray-webb-1986",
    role="outside_heat_transfer",
    surfaces=("plate",),
    arrangements=("inline", "staggered"),
    gives="nusselt",
    function=gray_webb_1986,
    inputs=("reynolds", "prandtl", "arrangement", "rows", *_PLATE_INPUTS),
    limits=_GRAY_LIMITS,
    derived_limits=_GRAY_DERIVED,
    source=_GRAY_SOURCE,
    doubt=_GRAY_DOUBT,
    note="Flat plates; Reynolds number on the collar. 89 % of the data lie within 10 %.",
    scatter_fraction=0.10,
    standard_uncertainty_fraction=0.09,
)

GRAY_WEBB_1986_DROP = Method(
    slug="gray-webb-1986",
    role="outside_pressure_drop",
    surfaces=("plate",),
    arrangements=("inline", "staggered"),
    gives="loss_coefficient",
    function=gray_webb_1986_drop,
    inputs=("reynolds", "arrangement", "rows", *_PLATE_INPUTS),
    limits=_GRAY_LIMITS,
    derived_limits=_GRAY_DERIVED,
    source=f"{_GRAY_SOURCE}; the bare bank after M. Jakob, Trans. ASME 60 (1938) 384-386",
    doubt=_GRAY_DOUBT,
    note=(
        "Plates and tubes as two losses added, entrance and exit included. The source's momentum term is "
        "left out: the change of momentum by heating or cooling is added duct to duct."
    ),
    scatter_fraction=0.13,
    standard_uncertainty_fraction=0.12,
)

RECORDS = (WANG_CHI_CHANG_2000, WANG_CHI_CHANG_2000_DROP, GRAY_WEBB_1986, GRAY_WEBB_1986_DROP)
