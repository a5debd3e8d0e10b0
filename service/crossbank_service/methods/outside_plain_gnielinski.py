"""Plain tube banks, outside heat transfer: Gnielinski 1979, the single row carried over to the bank."""

import numpy as np

from crossbank_service.methods._blend import LEAST_REYNOLDS, elementwise
from crossbank_service.methods._layout import free_area_ratio, is_staggered, void_fraction
from crossbank_service.methods.outside_plain_zukauskas import INLINE_SPACING
from crossbank_service.methods.record import Array, DerivedLimit, Limit, Method

_DEEP_BANK_ROWS = 10.0
_LEAST_ARRANGEMENT_FACTOR = 0.1


def _streamed_reynolds(
    *,
    reynolds: Array,
    transverse_pitch_ratio: Array,
    longitudinal_pitch_ratio: Array,
    arrangement: Array,
    rows: Array | None = None,
    **_others: Array,
) -> Array:
    """Reynolds number of the method: on L = pi d/2 with the empty-duct velocity over the void fraction."""
    a, b = np.asarray(transverse_pitch_ratio), np.asarray(longitudinal_pitch_ratio)
    sigma = free_area_ratio(a, b, np.asarray(arrangement), None if rows is None else np.asarray(rows))
    return np.asarray(reynolds) * sigma * (0.5 * np.pi) / void_fraction(a, b)


def _arrangement_factor(a: Array, b: Array, arrangement: Array) -> Array:
    slenderness = b / a
    psi = void_fraction(a, b)
    inline = 1.0 + 0.7 / (psi * np.sqrt(psi)) * (slenderness - 0.3) / np.square(slenderness + 0.7)
    factor = np.where(is_staggered(arrangement), 1.0 + 2.0 / (3.0 * b), inline)
    # Only pitches no tubes can have come here; the answer has to stay positive all the same.
    return np.maximum(factor, _LEAST_ARRANGEMENT_FACTOR)


def _mean_factor(rows: Array, factor: Array) -> Array:
    n = np.maximum(rows, 1.0)
    return np.where(n >= _DEEP_BANK_ROWS, factor, (1.0 + (n - 1.0) * factor) / n)


def _wall_factor(
    prandtl: Array, prandtl_wall: Array | None, temperature_ratio: Array | None, gas: Array | None
) -> Array:
    ln_liquid = np.zeros_like(prandtl) if prandtl_wall is None else np.log(prandtl / prandtl_wall)
    ln_liquid = np.where(ln_liquid > 0.0, 0.25, 0.11) * ln_liquid
    if gas is None:
        return np.exp(ln_liquid)
    ln_gas = np.zeros_like(prandtl) if temperature_ratio is None else np.log(temperature_ratio)
    ln_gas = 0.12 * np.minimum(ln_gas, 0.0)
    return np.exp(np.where(gas > 0.5, ln_gas, ln_liquid))


@elementwise
def gnielinski_1979(
    *,
    reynolds: Array,
    prandtl: Array,
    transverse_pitch_ratio: Array,
    longitudinal_pitch_ratio: Array,
    arrangement: Array,
    rows: Array,
    prandtl_wall: Array | None = None,
    temperature_ratio: Array | None = None,
    gas: Array | None = None,
) -> Array:
    """Mean Nusselt number of a plain bank after Gnielinski 1979.

    Parameters
    ----------
    reynolds : Array
        Re in the narrowest section, on the tube diameter [-]; converted to the method's own inside.
    prandtl : Array
        Pr of the bulk [-].
    transverse_pitch_ratio, longitudinal_pitch_ratio : Array
        a, b [-].
    arrangement : Array
        1 for staggered, 0 for in-line.
    rows : Array
        n [-].
    prandtl_wall : Array, optional
        Pr at the surface [-], used for liquids; left out: no wall correction.
    temperature_ratio : Array, optional
        Bulk over surface temperature in kelvin [-], used for gases; left out: no wall correction.
    gas : Array, optional
        1 for a gas, 0 for a liquid; left out: a liquid.

    Returns
    -------
    Array
        Nu on the tube diameter, mean over the rows [-].

    Notes
    -----
    V. Gnielinski, Int. Chem. Eng. 19 (1979) 380-390; HEDH 2.5.3; VDI Heat Atlas G7. On L = pi d/2:

        Nu_lam = 0.664 Re_L^0.5 Pr^(1/3)
        Nu_tur = 0.037 Re_L^0.8 Pr/(1 + 2.443 Re_L^-0.1 (Pr^(2/3) - 1))
        Nu_0 = 0.3 + sqrt(Nu_lam^2 + Nu_tur^2)
        f_A = 1 + 0.7/psi^1.5 (b/a - 0.3)/(b/a + 0.7)^2 in-line, 1 + 2/(3b) staggered
        Nu = f_A Nu_0 K for n >= 10, (1 + (n - 1) f_A)/n Nu_0 K below

    K = (Pr/Pr_w)^0.25 for a heated liquid, ^0.11 for a cooled one; (T/T_w)^0.12 for a heated gas, 1 for a
    cooled one. 10 < Re_L < 1e6, 0.6 < Pr < 1000.
    """
    own = np.maximum(
        _streamed_reynolds(
            reynolds=reynolds,
            transverse_pitch_ratio=transverse_pitch_ratio,
            longitudinal_pitch_ratio=longitudinal_pitch_ratio,
            arrangement=arrangement,
            rows=rows,
        ),
        LEAST_REYNOLDS,
    )
    cube_root = np.cbrt(prandtl)
    laminar = 0.664 * np.sqrt(own) * cube_root
    # Below Pr 1 the bracket turns negative at vanishing Re, far beneath where the term counts: held at 0.1.
    bracket = np.maximum(1.0 + 2.443 * own**-0.1 * (cube_root * cube_root - 1.0), 0.1)
    turbulent = 0.037 * own**0.8 * prandtl / bracket
    single_row = 0.3 + np.sqrt(laminar * laminar + turbulent * turbulent)
    factor = _arrangement_factor(transverse_pitch_ratio, longitudinal_pitch_ratio, arrangement)
    wall = _wall_factor(prandtl, prandtl_wall, temperature_ratio, gas)
    return 2.0 / np.pi * single_row * _mean_factor(rows, factor) * wall


@elementwise
def gnielinski_1979_row_share(
    *,
    row: Array,
    rows: Array,
    transverse_pitch_ratio: Array,
    longitudinal_pitch_ratio: Array,
    arrangement: Array,
    **_others: Array,
) -> Array:
    """Local coefficient of a row over the bank's mean.

    Notes
    -----
    Below ten rows the first is a single row and the others carry f_A, which is what the published mean says;
    from ten rows on the published mean is f_A itself, in every row.
    """
    factor = _arrangement_factor(transverse_pitch_ratio, longitudinal_pitch_ratio, arrangement)
    local = np.where((row < 1.5) & (rows < _DEEP_BANK_ROWS), 1.0, factor)
    return local / _mean_factor(rows, factor)


GNIELINSKI_1979 = Method(
    slug="gnielinski-1979",
    role="outside_heat_transfer",
    surfaces=("plain",),
    arrangements=("inline", "staggered"),
    gives="nusselt",
    function=gnielinski_1979,
    inputs=(
        "reynolds",
        "prandtl",
        "transverse_pitch_ratio",
        "longitudinal_pitch_ratio",
        "arrangement",
        "rows",
    ),
    options=("prandtl_wall", "temperature_ratio", "gas"),
    limits=(Limit(quantity="prandtl", at_least=0.6, at_most=1000.0),),
    derived_limits=(
        DerivedLimit(
            name="Reynolds number on half the circumference with the velocity over the void fraction",
            value=_streamed_reynolds,
            at_least=10.0,
            at_most=1e6,
        ),
        INLINE_SPACING,
    ),
    source="V. Gnielinski, Int. Chem. Eng. 19 (1979) 380-390; HEDH 2.5.3; VDI Heat Atlas G7",
    doubt=(
        "For cooled gases one reprint applies (T/T_w)^0.12 too (3.5 % at 1.33, 8 % at 2); here 1. Liquids "
        "above Re 1e5: 35 to 60 % above other methods. In-line with a/b below 0.7 no method is reliable."
    ),
    note=(
        "Reynolds and Nusselt number are converted from and to the tube diameter and the narrowest section. "
        "Below ten rows the first row is a single row and the others carry f_A; from ten rows on f_A in "
        "every row, so the mean steps by 3 to 5 % at ten rows, as published."
    ),
    scatter_fraction=0.15,
    standard_uncertainty_fraction=0.08,
    row_share=gnielinski_1979_row_share,
)

RECORDS = (GNIELINSKI_1979,)
