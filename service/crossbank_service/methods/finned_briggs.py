"""Banks of tubes with annular fins: Briggs & Young 1963, Stasiulevicius 1988, Robinson & Briggs 1966.

Nusselt and Reynolds numbers are on the root diameter, the velocity is that of the narrowest section, the
fluid is taken at the bulk mean. The coefficient is the true film on fins and prime surface and goes with
the exact annular fin efficiency. The momentum of a gas that expands or contracts is in no loss: it is added
duct to duct.
"""

import numpy as np

from crossbank_service.methods._blend import elementwise, geometric, log_reynolds, rise
from crossbank_service.methods._finned import (
    FIN_INPUTS,
    LEAST_FIN_HEIGHT,
    LEAST_FIN_THICKNESS,
    PITCHES,
    gap_over_height,
)
from crossbank_service.methods.fin_surfaces import diagonal_pitch, fin_gap, row_factor
from crossbank_service.methods.record import Array, Limit, Method


@elementwise
def briggs_young_1963(
    *,
    reynolds: Array,
    prandtl: Array,
    rows: Array,
    fin_height_m: Array,
    fin_thickness_m: Array,
    fin_pitch_m: Array,
) -> Array:
    """Mean Nusselt number of a staggered bank with annular fins after Briggs & Young 1963.

    Parameters
    ----------
    reynolds, prandtl : Array
        Re in the narrowest section on the root diameter, Pr of the bulk [-].
    rows : Array
        Rows along the stream [-].
    fin_height_m, fin_thickness_m, fin_pitch_m : Array
        Fin height h, thickness t and pitch [m].

    Returns
    -------
    Array
        Nu on the root diameter [-].

    Notes
    -----
    Nu = 0.134 Re^0.681 Pr^(1/3) (s/h)^0.2 (s/t)^0.1134 F_N, s the clear gap (D. E. Briggs & E. H. Young,
    Chem. Eng. Prog. Symp. Ser. 59 (1963) no. 41, 1-10). The source tested six rows and has no row factor;
    F_N is that of ESDU 86022. Re 1.1e3 to 1.8e4, equilateral layouts.
    """
    gap = fin_gap(fin_pitch_m=fin_pitch_m, fin_thickness_m=fin_thickness_m)
    over_height = gap_over_height(fin_height_m, fin_thickness_m, fin_pitch_m) ** 0.2
    over_thickness = (gap / np.maximum(fin_thickness_m, LEAST_FIN_THICKNESS)) ** 0.1134
    flow = np.exp(0.681 * log_reynolds(reynolds)) * np.cbrt(prandtl)
    return 0.134 * flow * over_height * over_thickness * row_factor(rows)


@elementwise
def stasiulevicius_1988(
    *,
    reynolds: Array,
    prandtl: Array,
    rows: Array,
    diameter_m: Array,
    fin_height_m: Array,
    fin_thickness_m: Array,
    fin_pitch_m: Array,
    transverse_pitch_m: Array,
    longitudinal_pitch_m: Array,
) -> Array:
    """Mean Nusselt number of a staggered bank with annular fins after Stasiulevicius & Skrinska 1988.

    Parameters
    ----------
    reynolds, prandtl : Array
        Re in the narrowest section on the root diameter, Pr of the bulk [-].
    rows : Array
        Rows along the stream [-].
    diameter_m : Array
        Root diameter d [m].
    fin_height_m, fin_thickness_m, fin_pitch_m : Array
        Fin height h, thickness t and pitch [m].
    transverse_pitch_m, longitudinal_pitch_m : Array
        Tube pitches P_t and P_l [m].

    Returns
    -------
    Array
        Nu on the root diameter [-].

    Notes
    -----
    Nu = 0.19 (P_t/P_l)^0.2 (s/d)^0.18 (h/d)^-0.14 Re^0.65 Pr^0.33 F_N, Re 1e2 to 2e4 (J. Stasiulevicius &
    A. Skrinska, Heat Transfer of Finned Tube Bundles in Crossflow, 1988; the form of HEDH 2.5.3). The row
    factor is that of ESDU 86022, as everywhere here.
    """
    gap = fin_gap(fin_pitch_m=fin_pitch_m, fin_thickness_m=fin_thickness_m)
    height = np.maximum(fin_height_m, LEAST_FIN_HEIGHT)
    shape = (gap / diameter_m) ** 0.18 * (height / diameter_m) ** -0.14
    pitches = (transverse_pitch_m / longitudinal_pitch_m) ** 0.2
    flow = np.exp(0.65 * log_reynolds(reynolds)) * prandtl**0.33
    return 0.19 * pitches * shape * flow * row_factor(rows)


@elementwise
def briggs_young_low_reynolds_blend(
    *,
    reynolds: Array,
    prandtl: Array,
    rows: Array,
    diameter_m: Array,
    fin_height_m: Array,
    fin_thickness_m: Array,
    fin_pitch_m: Array,
    transverse_pitch_m: Array,
    longitudinal_pitch_m: Array,
) -> Array:
    """Briggs & Young from Re 1000 up, Stasiulevicius & Skrinska below 500, a smooth passage between.

    Parameters
    ----------
    reynolds, prandtl : Array
        Re in the narrowest section on the root diameter, Pr of the bulk [-].
    rows : Array
        Rows along the stream [-].
    diameter_m : Array
        Root diameter [m].
    fin_height_m, fin_thickness_m, fin_pitch_m : Array
        Fin height, thickness and pitch [m].
    transverse_pitch_m, longitudinal_pitch_m : Array
        Tube pitches [m].

    Returns
    -------
    Array
        Nu on the root diameter [-].

    Notes
    -----
    ln Nu is blended by a cubic in ln Re between 500 and 1000 (own choice): a rating in which Re crosses 1000
    sees no jump. Equal to :func:`briggs_young_1963` from 1000 up, to the last bit.
    """
    shallow = stasiulevicius_1988(
        reynolds=reynolds,
        prandtl=prandtl,
        rows=rows,
        diameter_m=diameter_m,
        fin_height_m=fin_height_m,
        fin_thickness_m=fin_thickness_m,
        fin_pitch_m=fin_pitch_m,
        transverse_pitch_m=transverse_pitch_m,
        longitudinal_pitch_m=longitudinal_pitch_m,
    )
    parent = briggs_young_1963(
        reynolds=reynolds,
        prandtl=prandtl,
        rows=rows,
        fin_height_m=fin_height_m,
        fin_thickness_m=fin_thickness_m,
        fin_pitch_m=fin_pitch_m,
    )
    return geometric(shallow, parent, rise(log_reynolds(reynolds), 500.0, 1000.0))


@elementwise
def robinson_briggs_1966(
    *, reynolds: Array, diameter_m: Array, transverse_pitch_m: Array, longitudinal_pitch_m: Array
) -> Array:
    """Loss of one row of a staggered bank with annular fins after Robinson & Briggs 1966.

    Parameters
    ----------
    reynolds : Array
        Re in the narrowest section on the root diameter [-].
    diameter_m : Array
        Root diameter d [m].
    transverse_pitch_m, longitudinal_pitch_m : Array
        Tube pitches P_t and P_l [m].

    Returns
    -------
    Array
        4 f, velocity heads of the narrowest section per row [-].

    Notes
    -----
    f = 9.465 Re^-0.316 (P_t/d)^-0.927 (P_t/P_d)^0.515 in dp = 4 f N G^2/(2 rho), P_d the diagonal pitch (K.
    K. Robinson & D. E. Briggs, Chem. Eng. Prog. Symp. Ser. 62 (1966) no. 64, 177-184). The same law is
    printed with 18.93 for dp = Eu N G^2/rho.
    """
    diagonal = diagonal_pitch(
        transverse_pitch_m=transverse_pitch_m, longitudinal_pitch_m=longitudinal_pitch_m
    )
    pitches = (transverse_pitch_m / diameter_m) ** -0.927 * (transverse_pitch_m / diagonal) ** 0.515
    return 4.0 * 9.465 * np.exp(-0.316 * log_reynolds(reynolds)) * pitches


_BRIGGS_YOUNG_LIMITS = (
    Limit(quantity="diameter_m", at_least=0.0111, at_most=0.0409),
    Limit(quantity="fin_height_m", at_least=0.0014, at_most=0.0166),
    Limit(quantity="fin_thickness_m", at_least=0.00033, at_most=0.00202),
    Limit(quantity="fin_pitch_m", at_least=0.0013, at_most=0.00406),
    Limit(quantity="transverse_pitch_m", at_least=0.0245, at_most=0.111),
)

BRIGGS_YOUNG_1963 = Method(
    slug="briggs-young-1963",
    role="outside_heat_transfer",
    surfaces=("annular",),
    arrangements=("staggered",),
    gives="nusselt",
    function=briggs_young_1963,
    inputs=("reynolds", "prandtl", "rows", "fin_height_m", "fin_thickness_m", "fin_pitch_m"),
    limits=(Limit(quantity="reynolds", at_least=1.1e3, at_most=1.8e4), *_BRIGGS_YOUNG_LIMITS),
    source=(
        "D. E. Briggs & E. H. Young, Convection heat transfer and pressure drop of air flowing across "
        "triangular pitch banks of finned tubes, Chem. Eng. Prog. Symp. Ser. 59 (1963) no. 41, 1-10"
    ),
    note=(
        "The source tested equilateral banks of six rows and gives no row factor; 0.76, 0.84, 0.92 for "
        "1, 2, 3 rows are those of ESDU 86022, alike in every row. Use with the exact annular fin "
        "efficiency."
    ),
    scatter_fraction=0.05,
    standard_uncertainty_fraction=0.09,
)

STASIULEVICIUS_1988 = Method(
    slug="stasiulevicius-1988",
    role="outside_heat_transfer",
    surfaces=("annular",),
    arrangements=("staggered",),
    gives="nusselt",
    function=stasiulevicius_1988,
    inputs=("reynolds", "prandtl", "rows", *FIN_INPUTS, *PITCHES),
    limits=(Limit(quantity="reynolds", at_least=1e2, at_most=2e4),),
    source=(
        "J. Stasiulevicius & A. Skrinska, Heat Transfer of Finned Tube Bundles in Crossflow, Hemisphere "
        "1988, in the form of the Heat Exchanger Design Handbook 2.5.3"
    ),
    doubt="Lies 7 to 12 % below the mean of Briggs & Young, ESDU 86022 and Ganguli at Re 1e4.",
    note="Row factor that of ESDU 86022.",
    scatter_fraction=0.15,
    standard_uncertainty_fraction=0.12,
)

BRIGGS_YOUNG_LOW_REYNOLDS_BLEND = Method(
    slug="briggs-young-low-reynolds-blend",
    role="outside_heat_transfer",
    surfaces=("annular",),
    arrangements=("staggered",),
    gives="nusselt",
    function=briggs_young_low_reynolds_blend,
    inputs=("reynolds", "prandtl", "rows", *FIN_INPUTS, *PITCHES),
    limits=(Limit(quantity="reynolds", at_least=1e2, at_most=1.8e4), *_BRIGGS_YOUNG_LIMITS),
    source=f"{BRIGGS_YOUNG_1963.source}; below Re 1000: {STASIULEVICIUS_1988.source}",
    doubt=STASIULEVICIUS_1988.doubt,
    note=(
        "briggs-young-1963 from Re 1000 up, stasiulevicius-1988 below 500, ln Nu blended by a cubic in "
        f"ln Re between. {BRIGGS_YOUNG_1963.note}"
    ),
    scatter_fraction=0.10,
    standard_uncertainty_fraction=0.09,
)

ROBINSON_BRIGGS_1966 = Method(
    slug="robinson-briggs-1966",
    role="outside_pressure_drop",
    surfaces=("annular",),
    arrangements=("staggered",),
    gives="loss_coefficient",
    function=robinson_briggs_1966,
    inputs=("reynolds", "diameter_m", *PITCHES),
    limits=(
        Limit(quantity="reynolds", at_least=2e3, at_most=5e4),
        Limit(quantity="diameter_m", at_least=0.0186, at_most=0.0409),
        Limit(quantity="transverse_pitch_m", at_least=0.043, at_most=0.114),
    ),
    source=(
        "K. K. Robinson & D. E. Briggs, Pressure drop of air flowing across triangular pitch banks of "
        "finned tubes, Chem. Eng. Prog. Symp. Ser. 62 (1966) no. 64, 177-184"
    ),
    doubt=(
        "Knows neither fin height nor gap: up to 35 % low for dense high fins and 35 % high for sparse "
        "ones. A textbook prints the exponent -0.937 for -0.927 (1 %)."
    ),
    scatter_fraction=0.08,
    standard_uncertainty_fraction=0.15,
)

RECORDS = (BRIGGS_YOUNG_1963, STASIULEVICIUS_1988, BRIGGS_YOUNG_LOW_REYNOLDS_BLEND, ROBINSON_BRIGGS_1966)
