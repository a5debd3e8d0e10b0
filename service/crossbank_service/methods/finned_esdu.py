"""Banks of tubes with annular fins: ESDU 86022 for high fins and ESDU 84016 for low fins.

Heat transfer and loss. Nusselt and Reynolds numbers are on the root diameter, the velocity is that of the
narrowest section, the fluid is taken at the bulk mean. What a bank loses besides its rows, 1 + sigma^2
velocity heads, is the records' ``fixed_loss``; the momentum of a gas that expands or contracts is added
duct to duct.
"""

import numpy as np

from crossbank_service.methods._blend import elementwise, log_reynolds
from crossbank_service.methods._finned import (
    FIN_INPUTS,
    LEAST_FIN_HEIGHT,
    PITCHES,
    fin_area_ratio,
    gap_over_height,
    longitudinal_ratio,
    tip_over_root,
    wall_factor,
)
from crossbank_service.methods.fin_surfaces import blocked_width, fin_gap, free_width, row_factor
from crossbank_service.methods.record import Array, DerivedLimit, Limit, Method

# Gaps between tubes, per root diameter, are held here: no law reaches closer and powers of a gap stay finite.
_LEAST_GAP = 0.01


@elementwise
def esdu_86022(
    *,
    reynolds: Array,
    prandtl: Array,
    rows: Array,
    fin_height_m: Array,
    fin_thickness_m: Array,
    fin_pitch_m: Array,
    transverse_pitch_m: Array,
    longitudinal_pitch_m: Array,
    prandtl_wall: Array | None = None,
    gas: Array | None = None,
) -> Array:
    """Mean Nusselt number of a staggered bank with high annular fins after ESDU 86022.

    Parameters
    ----------
    reynolds, prandtl : Array
        Re in the narrowest section on the root diameter, Pr of the bulk [-].
    rows : Array
        Rows along the stream [-].
    fin_height_m, fin_thickness_m, fin_pitch_m : Array
        Fin height h, thickness t and pitch [m].
    transverse_pitch_m, longitudinal_pitch_m : Array
        Tube pitches P_t and P_l [m].
    prandtl_wall : Array, optional
        Pr at the surface [-]; left out: no wall correction.
    gas : Array, optional
        1 for a gas (no wall correction), 0 for a liquid.

    Returns
    -------
    Array
        Nu on the root diameter [-].

    Notes
    -----
    Nu = 0.242 Re^0.658 (s/h)^0.297 (P_t/P_l)^-0.091 Pr^(1/3) F_N (Pr/Pr_w)^0.26 (ESDU 86022, 1986, as
    printed by Hewitt, Shires & Bott, Process Heat Transfer, 1994). Re 5e3 to 5e4.
    """
    shape = gap_over_height(fin_height_m, fin_thickness_m, fin_pitch_m) ** 0.297
    pitches = (transverse_pitch_m / longitudinal_pitch_m) ** -0.091
    flow = np.exp(0.658 * log_reynolds(reynolds)) * np.cbrt(prandtl)
    return 0.242 * flow * shape * pitches * row_factor(rows) * wall_factor(prandtl, prandtl_wall, gas)


@elementwise
def esdu_84016(
    *,
    reynolds: Array,
    prandtl: Array,
    rows: Array,
    diameter_m: Array,
    fin_height_m: Array,
    fin_thickness_m: Array,
    fin_pitch_m: Array,
    transverse_pitch_m: Array,
    prandtl_wall: Array | None = None,
    gas: Array | None = None,
) -> Array:
    """Mean Nusselt number of a staggered bank with low fins after ESDU 84016.

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
    transverse_pitch_m : Array
        Transverse pitch P_t [m].
    prandtl_wall : Array, optional
        Pr at the surface [-]; left out: no wall correction.
    gas : Array, optional
        1 for a gas (no wall correction), 0 for a liquid.

    Returns
    -------
    Array
        Nu on the root diameter [-].

    Notes
    -----
    Nu = 0.183 Re^0.7 (s/h)^0.36 (P_t/d_f)^0.06 (h/d_f)^0.11 Pr^0.36 F_N (Pr/Pr_w)^0.26, d_f over the fins
    (ESDU 84016, 1984; Rabas & Taborek, Heat Transfer Eng. 8 (1987) no. 2, 49-62). Re 1e3 to 8e4.
    """
    height = np.maximum(fin_height_m, LEAST_FIN_HEIGHT)
    tip = diameter_m + 2.0 * height
    shape = gap_over_height(height, fin_thickness_m, fin_pitch_m) ** 0.36
    layout = (transverse_pitch_m / tip) ** 0.06 * (height / tip) ** 0.11
    flow = np.exp(0.7 * log_reynolds(reynolds)) * prandtl**0.36
    return 0.183 * flow * shape * layout * row_factor(rows) * wall_factor(prandtl, prandtl_wall, gas)


@elementwise
def esdu_86022_drop(
    *,
    reynolds: Array,
    diameter_m: Array,
    fin_height_m: Array,
    fin_thickness_m: Array,
    fin_pitch_m: Array,
    transverse_pitch_m: Array,
    longitudinal_pitch_m: Array,
) -> Array:
    """Loss of one row of a staggered bank with high annular fins after ESDU 86022.

    Parameters
    ----------
    reynolds : Array
        Re in the narrowest section on the root diameter [-].
    diameter_m : Array
        Root diameter d [m].
    fin_height_m, fin_thickness_m, fin_pitch_m : Array
        Fin height, thickness and pitch [m].
    transverse_pitch_m, longitudinal_pitch_m : Array
        Tube pitches P_t and P_l [m].

    Returns
    -------
    Array
        K_f, velocity heads of the narrowest section per row [-].

    Notes
    -----
    dp = (1 + sigma^2 + N K_f) G^2/(2 rho), K_f = 4.567 Re^-0.242 (A/A_bare)^0.504 (P_t/d)^-0.376
    (P_l/d)^-0.546 (ESDU 86022, 1986, as printed by Hewitt, Shires & Bott 1994). 1 + sigma^2 (entrance and
    exit) is the fixed loss.
    """
    ratio = fin_area_ratio(
        diameter_m=diameter_m,
        fin_height_m=fin_height_m,
        fin_thickness_m=fin_thickness_m,
        fin_pitch_m=fin_pitch_m,
    )
    pitches = (transverse_pitch_m / diameter_m) ** -0.376 * (longitudinal_pitch_m / diameter_m) ** -0.546
    return 4.567 * np.exp(-0.242 * log_reynolds(reynolds)) * ratio**0.504 * pitches


@elementwise
def contraction_loss(
    *,
    diameter_m: Array,
    fin_height_m: Array,
    fin_thickness_m: Array,
    fin_pitch_m: Array,
    transverse_pitch_m: Array,
    longitudinal_pitch_m: Array,
    **_others: Array,
) -> Array:
    """Entrance and exit of a staggered finned bank in velocity heads of the narrowest section.

    Parameters
    ----------
    diameter_m : Array
        Root diameter [m].
    fin_height_m, fin_thickness_m, fin_pitch_m : Array
        Fin height, thickness and pitch [m].
    transverse_pitch_m, longitudinal_pitch_m : Array
        Tube pitches [m].
    **_others : Array
        Further inputs of the method, not used.

    Returns
    -------
    Array
        1 + sigma^2 [-], sigma = narrowest section over empty duct, per transverse pitch.

    Notes
    -----
    ESDU 86022 (1986) and 84016 (1984), as printed by Hewitt, Shires & Bott 1994.
    """
    blocked = blocked_width(
        diameter_m=diameter_m,
        fin_height_m=fin_height_m,
        fin_thickness_m=fin_thickness_m,
        fin_pitch_m=fin_pitch_m,
    )
    width = free_width(
        arrangement=1.0,
        transverse_pitch_m=transverse_pitch_m,
        longitudinal_pitch_m=longitudinal_pitch_m,
        blocked_width_m=blocked,
    )
    return 1.0 + (width / transverse_pitch_m) ** 2


@elementwise
def esdu_84016_drop(
    *,
    reynolds: Array,
    diameter_m: Array,
    fin_height_m: Array,
    fin_thickness_m: Array,
    fin_pitch_m: Array,
    transverse_pitch_m: Array,
    longitudinal_pitch_m: Array,
) -> Array:
    """Loss of one row of a staggered bank with low fins after ESDU 84016.

    Parameters
    ----------
    reynolds : Array
        Re in the narrowest section on the root diameter [-].
    diameter_m : Array
        Root diameter d [m].
    fin_height_m, fin_thickness_m, fin_pitch_m : Array
        Fin height h, thickness and pitch [m].
    transverse_pitch_m, longitudinal_pitch_m : Array
        Tube pitches P_t and P_l [m].

    Returns
    -------
    Array
        K_f, velocity heads of the narrowest section per row [-].

    Notes
    -----
    dp = (1 + sigma^2 + N K_f) G^2/(2 rho), K_f = 4.71 Re^-0.286 (h/s)^0.51 ((P_t-d)/(P_l-d))^0.536
    (d/(P_t-d))^0.36 (ESDU 84016, 1984, as printed by Hewitt, Shires & Bott 1994). The gaps are held at a
    hundredth of the diameter: the form has no meaning where rows interlock (P_l below d).
    """
    gap = fin_gap(fin_pitch_m=fin_pitch_m, fin_thickness_m=fin_thickness_m)
    across = np.maximum(transverse_pitch_m / diameter_m - 1.0, _LEAST_GAP)
    along = np.maximum(longitudinal_pitch_m / diameter_m - 1.0, _LEAST_GAP)
    fins = (np.maximum(fin_height_m, LEAST_FIN_HEIGHT) / gap) ** 0.51
    return 4.71 * np.exp(-0.286 * log_reynolds(reynolds)) * fins * (across / along) ** 0.536 * across**-0.36


ESDU_86022 = Method(
    slug="esdu-86022",
    role="outside_heat_transfer",
    surfaces=("annular",),
    arrangements=("staggered",),
    gives="nusselt",
    function=esdu_86022,
    inputs=("reynolds", "prandtl", "rows", "fin_height_m", "fin_thickness_m", "fin_pitch_m", *PITCHES),
    options=("prandtl_wall", "gas"),
    limits=(
        Limit(quantity="reynolds", at_least=5e3, at_most=5e4),
        Limit(quantity="diameter_m", at_least=0.0095, at_most=0.051),
        Limit(quantity="fin_height_m", at_least=0.0085, at_most=0.016),
        Limit(quantity="fin_pitch_m", at_least=0.0254 / 11.0, at_most=0.0254 / 4.0),
    ),
    derived_limits=(
        DerivedLimit(name="fin tip over root diameter", value=tip_over_root, at_least=1.2, at_most=2.4),
    ),
    source=(
        "ESDU 86022, High-fin staggered tube banks: heat transfer and pressure drop for turbulent single "
        "phase gas flow, 1986, as printed by Hewitt, Shires & Bott, Process Heat Transfer, CRC Press 1994"
    ),
    note=(
        "Row factor 0.76, 0.84, 0.92 for 1, 2, 3 rows. No wall factor for gases, (Pr/Pr_w)^0.26 for liquids."
    ),
    scatter_fraction=0.10,
    standard_uncertainty_fraction=0.09,
)

ESDU_84016 = Method(
    slug="esdu-84016",
    role="outside_heat_transfer",
    surfaces=("annular",),
    arrangements=("staggered",),
    gives="nusselt",
    function=esdu_84016,
    inputs=("reynolds", "prandtl", "rows", *FIN_INPUTS, "transverse_pitch_m"),
    options=("prandtl_wall", "gas"),
    limits=(
        Limit(quantity="reynolds", at_least=1e3, at_most=8e4),
        Limit(quantity="diameter_m", at_least=0.0127, at_most=0.032),
        Limit(quantity="fin_height_m", at_least=0.0008, at_most=0.0026),
        Limit(quantity="fin_pitch_m", at_least=0.0254 / 32.0, at_most=0.0254 / 11.0),
    ),
    source=(
        "ESDU 84016, Low-fin staggered tube banks: heat transfer and pressure drop for turbulent single "
        "phase cross flow, 1984; T. J. Rabas & J. Taborek, Heat Transfer Eng. 8 (1987) no. 2, 49-62"
    ),
    doubt=(
        "Reprints put the last two ratios on the diameter over the fins or on the root diameter: 4 % "
        "apart for a diameter ratio of 1.3. Here: over the fins, the lower for h."
    ),
    note="Row factor 0.76, 0.84, 0.92 for 1, 2, 3 rows, that of high fins.",
    scatter_fraction=0.08,
    standard_uncertainty_fraction=0.09,
)

ESDU_86022_DROP = Method(
    slug="esdu-86022",
    role="outside_pressure_drop",
    surfaces=("annular",),
    arrangements=("staggered",),
    gives="loss_coefficient",
    function=esdu_86022_drop,
    inputs=("reynolds", *FIN_INPUTS, *PITCHES),
    limits=ESDU_86022.limits,
    derived_limits=(
        DerivedLimit(name="fin tip over root diameter", value=tip_over_root, at_least=1.2, at_most=2.4),
    ),
    source=ESDU_86022.source,
    note=(
        "1 + sigma^2 velocity heads for entrance and exit besides the rows; the change of momentum by "
        "heating or cooling is added duct to duct. 72 % of the data lie within 10 %."
    ),
    scatter_fraction=0.10,
    standard_uncertainty_fraction=0.10,
    fixed_loss=contraction_loss,
)

ESDU_84016_DROP = Method(
    slug="esdu-84016",
    role="outside_pressure_drop",
    surfaces=("annular",),
    arrangements=("staggered",),
    gives="loss_coefficient",
    function=esdu_84016_drop,
    inputs=("reynolds", *FIN_INPUTS, *PITCHES),
    limits=ESDU_84016.limits,
    derived_limits=(
        DerivedLimit(name="longitudinal pitch over root diameter", value=longitudinal_ratio, at_least=1.0),
    ),
    source=ESDU_84016.source,
    doubt="A published transcription has 4.72 for 4.71 (0.1 %).",
    note=(
        "1 + sigma^2 velocity heads for entrance and exit besides the rows; the change of momentum by "
        "heating or cooling is added duct to duct. Standard deviation 7.7 % on 81 points."
    ),
    scatter_fraction=0.077,
    standard_uncertainty_fraction=0.09,
    fixed_loss=contraction_loss,
)

RECORDS = (ESDU_86022, ESDU_84016, ESDU_86022_DROP, ESDU_84016_DROP)
