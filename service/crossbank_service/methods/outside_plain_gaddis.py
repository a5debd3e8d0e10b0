"""Plain tube banks, outside pressure drop: Gaddis & Gnielinski 1985."""

import numpy as np

from crossbank_service.methods._blend import LEAST_REYNOLDS, elementwise
from crossbank_service.methods._layout import (
    diagonal_gap_ratio,
    diagonal_governs,
    diagonal_pitch_ratio,
    is_staggered,
    transverse_gap_ratio,
    volumetric_diameter_ratio,
)
from crossbank_service.methods.record import Array, DerivedLimit, Limit, Mask, Method

_LEAST_TURBULENT_FACTOR = 0.1


def _power(base: Array, exponent: Array | float) -> Array:
    return np.exp(exponent * np.log(base))


@elementwise
def gaddis_gnielinski_1985_resistances(
    *,
    rows: Array,
    transverse_pitch_ratio: Array,
    longitudinal_pitch_ratio: Array,
    arrangement: Array,
    **_others: Array,
) -> Array:
    """Count the row resistances: n, or n - 1 where the diagonal gap governs (one row alone: 1)."""
    diagonal = diagonal_governs(transverse_pitch_ratio, longitudinal_pitch_ratio, arrangement, rows)
    return np.where(diagonal, rows - 1.0, rows)


def _end_effect(rows: Array, a: Array, b: Array, diagonal: Mask) -> Array:
    """Inlet and outlet losses f_n spread over the resistances; none from ten rows on."""
    few = np.maximum(1.0 / np.maximum(rows, 1.0) - 0.1, 0.0)
    gap = diagonal_gap_ratio(a, b) / (a * transverse_gap_ratio(a))
    return few * np.where(diagonal, gap * gap, 1.0 / (a * a))


def _onset(reynolds: Array, staggered: Mask) -> Array:
    """Weight F with which the turbulent part and the end effect set in."""
    rest: Array = np.expm1(np.where(staggered, -(reynolds + 200.0) / 1000.0, -(reynolds + 1000.0) / 2000.0))
    return -rest


@elementwise
def gaddis_gnielinski_1985_end_loss(
    *,
    reynolds: Array,
    rows: Array,
    transverse_pitch_ratio: Array,
    longitudinal_pitch_ratio: Array,
    arrangement: Array,
    **_others: Array,
) -> Array:
    """Inlet and outlet losses f_n F in one row resistance [-]; 0 from ten rows on."""
    a, b = transverse_pitch_ratio, longitudinal_pitch_ratio
    re = np.maximum(reynolds, LEAST_REYNOLDS)
    diagonal = diagonal_governs(a, b, arrangement, rows)
    return _end_effect(rows, a, b, diagonal) * _onset(re, is_staggered(arrangement))


def _turbulent_inline(reynolds: Array, a: Array, b: Array) -> Array:
    slenderness = b / a
    opening = np.maximum(1.0 - 0.94 / b, 0.0) ** 0.6
    factor = (0.22 + 1.2 * opening / (a - 0.85) ** 1.3) * _power(
        np.full_like(slenderness, 10.0), 0.47 * (slenderness - 1.5)
    ) + 0.03 * (a - 1.0) * (b - 1.0)
    return np.maximum(factor, _LEAST_TURBULENT_FACTOR) * _power(reynolds, -0.1 * slenderness)


def _turbulent_staggered(reynolds: Array, a: Array, b: Array) -> Array:
    slim, flat = b / a - 1.0, a / b - 1.0
    factor = 2.5 + 1.2 / (a - 0.85) ** 1.08 + 0.4 * slim * slim * slim - 0.01 * flat * flat * flat
    fast = 1.0 + (np.clip(reynolds, 2.5e5, 3e5) - 2.5e5) / 3.25e5
    return np.maximum(factor, _LEAST_TURBULENT_FACTOR) * reynolds**-0.25 * fast


@elementwise
def gaddis_gnielinski_1985(
    *,
    reynolds: Array,
    transverse_pitch_ratio: Array,
    longitudinal_pitch_ratio: Array,
    arrangement: Array,
    rows: Array,
    viscosity_ratio: Array | None = None,
) -> Array:
    """Loss coefficient of one row resistance of a plain bank after Gaddis & Gnielinski 1985.

    Parameters
    ----------
    reynolds : Array
        Re in the narrowest section, on the tube diameter [-].
    transverse_pitch_ratio, longitudinal_pitch_ratio : Array
        a, b [-].
    arrangement : Array
        1 for staggered, 0 for in-line.
    rows : Array
        n [-].
    viscosity_ratio : Array, optional
        Viscosity at the surface over viscosity of the bulk [-]; left out: 1.

    Returns
    -------
    Array
        xi in velocity heads of the narrowest section [-]; as many as ``gaddis_gnielinski_1985_resistances``.

    Notes
    -----
    E. S. Gaddis, V. Gnielinski, Int. Chem. Eng. 25 (1985) 1-15; VDI Heat Atlas L1.4.

        xi = xi_lam z_l + (xi_tur z_t + f_n) F
        xi_lam = 280 pi ((b^0.5 - 0.6)^2 + 0.75)/((4ab - pi) X^1.6 Re)
        xi_tur = f_at/Re^(0.1 b/a) in-line, f_at/Re^0.25 staggered
        f_at = (0.22 + 1.2 (1 - 0.94/b)^0.6/(a - 0.85)^1.3) 10^(0.47(b/a - 1.5)) + 0.03(a - 1)(b - 1) in-line,
               2.5 + 1.2/(a - 0.85)^1.08 + 0.4(b/a - 1)^3 - 0.01(a/b - 1)^3 staggered
        f_n = (1/n - 0.1)/a^2 below ten rows, (1/n - 0.1)(2(c - 1)/(a(a - 1)))^2 if the diagonal gap governs
        F = 1 - exp(-(Re + 1000)/2000) in-line, 1 - exp(-(Re + 200)/1000) staggered
        z_t = (mu_w/mu)^0.14, z_l = (mu_w/mu)^(0.57/((4ab/pi - 1) Re)^0.25)

    with X = a, or c if the diagonal gap governs.

    1 < Re < 3e5, n >= 5, 1.25 <= a <= 3, b 1.2 to 3 in-line and 0.6 to 3 staggered, c >= 1.25. The staggered
    factor 1 + (Re - 250000)/325000 is held from 3e5 on and the exponent of z_l below Re 1.
    """
    a, b = np.broadcast_arrays(transverse_pitch_ratio, longitudinal_pitch_ratio)
    re = np.maximum(reynolds, LEAST_REYNOLDS)
    staggered = is_staggered(arrangement)
    diagonal = diagonal_governs(a, b, arrangement, rows)
    voids = volumetric_diameter_ratio(a, b)
    reference = np.where(diagonal, diagonal_pitch_ratio(a, b), a)
    opening = np.sqrt(b) - 0.6
    laminar = 280.0 * (opening * opening + 0.75) / (voids * reference**1.6 * re)
    turbulent = np.where(staggered, _turbulent_staggered(re, a, b), _turbulent_inline(re, a, b))
    if viscosity_ratio is not None:
        ln_ratio = np.log(viscosity_ratio)
        laminar = laminar * np.exp(0.57 * ln_ratio / (voids * np.maximum(re, 1.0)) ** 0.25)
        turbulent = turbulent * np.exp(0.14 * ln_ratio)
    loss: Array = laminar + (turbulent + _end_effect(rows, a, b, diagonal)) * _onset(re, staggered)
    return loss


def diagonal_pitch(
    *, transverse_pitch_ratio: Array, longitudinal_pitch_ratio: Array, **_others: Array
) -> Array:
    """Diagonal pitch ratio c [-] from a method's inputs."""
    return diagonal_pitch_ratio(np.asarray(transverse_pitch_ratio), np.asarray(longitudinal_pitch_ratio))


GEOMETRY_LIMITS = (
    Limit(quantity="transverse_pitch_ratio", at_least=1.25, at_most=3.0),
    Limit(quantity="longitudinal_pitch_ratio", at_least=1.2, at_most=3.0, arrangement="inline"),
    Limit(quantity="longitudinal_pitch_ratio", at_least=0.6, at_most=3.0, arrangement="staggered"),
    Limit(quantity="rows", at_least=5.0),
)
DIAGONAL_LIMIT = DerivedLimit(
    name="diagonal pitch ratio", value=diagonal_pitch, at_least=1.25, arrangement="staggered"
)
INPUTS = ("reynolds", "transverse_pitch_ratio", "longitudinal_pitch_ratio", "arrangement", "rows")

GADDIS_GNIELINSKI_1985 = Method(
    slug="gaddis-gnielinski-1985",
    role="outside_pressure_drop",
    surfaces=("plain",),
    arrangements=("inline", "staggered"),
    gives="loss_coefficient",
    function=gaddis_gnielinski_1985,
    inputs=INPUTS,
    options=("viscosity_ratio",),
    limits=(Limit(quantity="reynolds", at_least=1.0, at_most=3e5), *GEOMETRY_LIMITS),
    derived_limits=(DIAGONAL_LIMIT,),
    source="E. S. Gaddis, V. Gnielinski, Int. Chem. Eng. 25 (1985) 1-15; VDI Heat Atlas L1.4",
    doubt=(
        "No print of the scatter was at hand; 30 % is 95 % of the differences from Zukauskas & Ulinskas 1988 "
        "at Re 1e3 to 1e5. At Re 100 to 1000 this law is the lower by a third staggered and a quarter "
        "in-line. The staggered factor above Re 2.5e5 is from memory."
    ),
    note=(
        "With the diagonal gap governing, n - 1 resistances; f_n by the number of rows, also below five "
        "rows; one staggered row has no diagonal. Wall factors for gases and liquids as printed."
    ),
    scatter_fraction=0.30,
    standard_uncertainty_fraction=0.14,
    resistances=gaddis_gnielinski_1985_resistances,
)

RECORDS = (GADDIS_GNIELINSKI_1985,)
