"""Plain tube banks, outside pressure drop: Jakob 1938 and Gunter & Shaw 1945."""

import numpy as np

from crossbank_service.methods._blend import elementwise, joined, log_reynolds
from crossbank_service.methods._layout import is_staggered, transverse_gap_ratio, volumetric_diameter_ratio
from crossbank_service.methods.record import Array, Limit, Method


def _with_wall(loss: Array, viscosity_ratio: Array | None) -> Array:
    return loss if viscosity_ratio is None else loss * np.exp(0.14 * np.log(viscosity_ratio))


@elementwise
def jakob_1938(
    *,
    reynolds: Array,
    transverse_pitch_ratio: Array,
    longitudinal_pitch_ratio: Array,
    arrangement: Array,
    viscosity_ratio: Array | None = None,
) -> Array:
    """Loss coefficient of one row of a plain bank after Jakob 1938.

    Parameters
    ----------
    reynolds : Array
        Re in the narrowest section, on the tube diameter [-].
    transverse_pitch_ratio, longitudinal_pitch_ratio : Array
        a, b [-].
    arrangement : Array
        1 for staggered, 0 for in-line.
    viscosity_ratio : Array, optional
        Viscosity at the surface over viscosity of the bulk [-]; left out: 1.

    Returns
    -------
    Array
        xi in velocity heads of the narrowest section [-].

    Notes
    -----
    xi = 4 f' (mu_w/mu)^0.14 with f' = (0.25 + 0.118/(a - 1)^1.08) Re^-0.16 staggered and
    (0.044 + 0.08 b/(a - 1)^(0.43 + 1.13/b)) Re^-0.15 in-line (M. Jakob, Trans. ASME 60 (1938) 384-386, in the
    form of Holman, Heat Transfer). 2000 < Re < 40000, n >= 10.
    """
    ln_re = log_reynolds(reynolds)
    b = longitudinal_pitch_ratio
    ln_gap = np.log(transverse_gap_ratio(transverse_pitch_ratio))
    staggered = (0.25 + 0.118 * np.exp(-1.08 * ln_gap)) * np.exp(-0.16 * ln_re)
    inline = (0.044 + 0.08 * b * np.exp(-(0.43 + 1.13 / b) * ln_gap)) * np.exp(-0.15 * ln_re)
    return _with_wall(4.0 * np.where(is_staggered(arrangement), staggered, inline), viscosity_ratio)


@elementwise
def gunter_shaw_1945(
    *,
    reynolds: Array,
    transverse_pitch_ratio: Array,
    longitudinal_pitch_ratio: Array,
    viscosity_ratio: Array | None = None,
) -> Array:
    """Loss coefficient of one row of a plain bank after Gunter & Shaw 1945.

    Parameters
    ----------
    reynolds : Array
        Re in the narrowest section, on the tube diameter [-]; taken to the volumetric diameter inside.
    transverse_pitch_ratio, longitudinal_pitch_ratio : Array
        a, b [-].
    viscosity_ratio : Array, optional
        Viscosity at the surface over viscosity of the bulk [-]; left out: 1.

    Returns
    -------
    Array
        xi in velocity heads of the narrowest section [-].

    Notes
    -----
    On Dv = d(4ab/pi - 1): f/2 = 0.96 Re_v^-0.145 above Re_v 200, 90/Re_v below; dp = (f/2) G^2 n S_L/(rho Dv)
    (mu/mu_w)^-0.14 (Dv/S_T)^0.4 (S_L/S_T)^0.6 (A. Y. Gunter, W. A. Shaw, Trans. ASME 67 (1945) 643-660). S_L
    is the pitch from row to row in both arrangements.
    """
    a, b = transverse_pitch_ratio, longitudinal_pitch_ratio
    voids = volumetric_diameter_ratio(a, b)
    ln_re = log_reynolds(reynolds) + np.log(voids)
    ln_half = joined(ln_re, (np.log(90.0) - ln_re, np.log(0.96) - 0.145 * ln_re), (200.0,))
    layout = b / voids * (voids / a) ** 0.4 * (b / a) ** 0.6
    return _with_wall(2.0 * np.exp(ln_half) * layout, viscosity_ratio)


JAKOB_1938 = Method(
    slug="jakob-1938",
    role="outside_pressure_drop",
    surfaces=("plain",),
    arrangements=("inline", "staggered"),
    gives="loss_coefficient",
    function=jakob_1938,
    inputs=("reynolds", "transverse_pitch_ratio", "longitudinal_pitch_ratio", "arrangement"),
    options=("viscosity_ratio",),
    limits=(
        Limit(quantity="reynolds", at_least=2000.0, at_most=40000.0),
        Limit(quantity="rows", at_least=10.0),
    ),
    source="M. Jakob, Trans. ASME 60 (1938) 384-386, in the form of Holman, Heat Transfer",
    doubt=(
        "40 to 70 % high at a transverse pitch ratio of 1.25; elsewhere within 20 % of newer methods. Some "
        "reprints have 0.1175 for 0.118."
    ),
    note="A power law of Re: below its range it falls short of the viscous loss.",
    scatter_fraction=0.30,
    standard_uncertainty_fraction=0.15,
)

GUNTER_SHAW_1945 = Method(
    slug="gunter-shaw-1945",
    role="outside_pressure_drop",
    surfaces=("plain",),
    arrangements=("inline", "staggered"),
    gives="loss_coefficient",
    function=gunter_shaw_1945,
    inputs=("reynolds", "transverse_pitch_ratio", "longitudinal_pitch_ratio"),
    options=("viscosity_ratio",),
    limits=(Limit(quantity="longitudinal_pitch_ratio", at_least=1.0, arrangement="inline"),),
    source="A. Y. Gunter, W. A. Shaw, Trans. ASME 67 (1945) 643-660",
    doubt=(
        "Whether the longitudinal pitch of a staggered bank is meant from row to row or to the nearest tube "
        "of the next row is unclear (9 % for equilateral pitches)."
    ),
    note=(
        "Row-to-row pitch in both arrangements. The two laws differ by 1 % where they meet and pass smoothly."
    ),
    scatter_fraction=0.35,
    standard_uncertainty_fraction=0.18,
)

RECORDS = (JAKOB_1938, GUNTER_SHAW_1945)
