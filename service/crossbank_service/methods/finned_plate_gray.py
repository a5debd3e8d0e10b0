"""Banks of tubes through continuous flat plate fins: Gray & Webb 1986.

Nusselt and Reynolds numbers are on the collar diameter (tube and twice the plate's thickness), the velocity
is that of the narrowest section between collars and plates. Wavy and louvred plates are beyond this law.
"""

import numpy as np

from crossbank_service.methods._blend import elementwise, log_reynolds
from crossbank_service.methods._finned import PLATE_INPUTS, longitudinal_ratio, plate_cell
from crossbank_service.methods._layout import is_staggered
from crossbank_service.methods.fin_surfaces import fin_gap
from crossbank_service.methods.outside_plain_older import jakob_1938
from crossbank_service.methods.record import Array, DerivedLimit, Limit, Method

# In-line plates have no law of their own: staggered ones reduced by these (engineering judgement).
_INLINE_HEAT = 0.7
_INLINE_DROP = 0.6


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
    fin, _, section = plate_cell(
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
def _transverse_ratio(*, transverse_pitch_m: Array, diameter_m: Array, **_others: Array) -> Array:
    return transverse_pitch_m / diameter_m


@elementwise
def _gap_ratio(*, fin_pitch_m: Array, fin_thickness_m: Array, diameter_m: Array, **_others: Array) -> Array:
    return fin_gap(fin_pitch_m=fin_pitch_m, fin_thickness_m=fin_thickness_m) / diameter_m


_GRAY_LIMITS = (
    Limit(quantity="reynolds", at_least=500.0, at_most=2.47e4),
    Limit(quantity="rows", at_least=1.0, at_most=8.0),
)
_GRAY_DERIVED = (
    DerivedLimit(
        name="transverse pitch over collar diameter", value=_transverse_ratio, at_least=1.97, at_most=2.55
    ),
    DerivedLimit(
        name="longitudinal pitch over collar diameter", value=longitudinal_ratio, at_least=1.7, at_most=2.58
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

GRAY_WEBB_1986 = Method(
    slug="gray-webb-1986",
    role="outside_heat_transfer",
    surfaces=("plate",),
    arrangements=("inline", "staggered"),
    gives="nusselt",
    function=gray_webb_1986,
    inputs=("reynolds", "prandtl", "arrangement", "rows", *PLATE_INPUTS),
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
    inputs=("reynolds", "arrangement", "rows", *PLATE_INPUTS),
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

RECORDS = (GRAY_WEBB_1986, GRAY_WEBB_1986_DROP)
