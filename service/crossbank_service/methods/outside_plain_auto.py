"""Plain tube banks, outside heat transfer: the default, three laws joined by where each is best."""

from collections.abc import Callable
from functools import partial

import numpy as np

from crossbank_service.methods._blend import elementwise, log_reynolds, rise
from crossbank_service.methods.outside_plain_gnielinski import (
    GNIELINSKI_1979,
    gnielinski_1979,
    gnielinski_1979_row_share,
)
from crossbank_service.methods.outside_plain_zukauskas import (
    INLINE_SPACING,
    esdu_73031,
    esdu_73031_row_share,
    zukauskas_1987,
    zukauskas_1987_row_share,
)
from crossbank_service.methods.record import Array, Limit, Method

_POOR_SPACING = 0.7

_Weights = tuple[Array, Array, Array]


def _weights(middle: Array, fast: Array) -> _Weights:
    """Weights of the slow, middle and fast law; they add up to 1."""
    return 1.0 - middle, middle * (1.0 - fast), middle * fast


def _gas_weights(reynolds: Array) -> _Weights:
    ln_re = log_reynolds(reynolds)
    # Within a factor 2 the step down from the one law to the other would outrun the rise of either with Re.
    return _weights(rise(ln_re, 500.0, 1e3), rise(ln_re, 1e5, 4e5))


def _liquid_weights(reynolds: Array, prandtl: Array) -> _Weights:
    ln_re = log_reynolds(reynolds)
    viscous = rise(np.log(prandtl), 35.0, 70.0)
    fast = 1.0 - (1.0 - rise(ln_re, 3e4, 1e5)) * (1.0 - viscous)
    return _weights(rise(ln_re, 500.0, 1e3), fast)


def _where_asked(weight: Array, law: Callable[[], Array], idle: float) -> Array:
    """A law's answer, or ``idle`` where no case gives it weight: at weight 0 its value leaves no trace."""
    return law() if np.any(weight > 0.0) else np.full(1, idle)


def _mixed(weights: _Weights, laws: tuple[Callable[[], Array], ...]) -> Array:
    """Geometric mean by weight, bit for bit the one law where it stands alone."""
    w_slow, w_middle, w_fast = weights
    slow, middle, fast = (_where_asked(w, law, 1.0) for w, law in zip(weights, laws, strict=True))
    if np.all((w_slow >= 1.0) | (w_middle >= 1.0) | (w_fast >= 1.0)):
        return np.where(w_slow >= 1.0, slow, np.where(w_middle >= 1.0, middle, fast))
    mixed = np.exp(w_slow * np.log(slow) + w_middle * np.log(middle) + w_fast * np.log(fast))
    return np.where(
        w_slow >= 1.0, slow, np.where(w_middle >= 1.0, middle, np.where(w_fast >= 1.0, fast, mixed))
    )


def _shares(weights: _Weights, quantities: dict[str, Array]) -> Array:
    laws = (esdu_73031_row_share, gnielinski_1979_row_share, zukauskas_1987_row_share)
    slow, middle, fast = (
        w * _where_asked(w, partial(law, **quantities), 0.0) for w, law in zip(weights, laws, strict=True)
    )
    return slow + middle + fast


@elementwise
def gnielinski_zukauskas_gas(
    *,
    reynolds: Array,
    prandtl: Array,
    transverse_pitch_ratio: Array,
    longitudinal_pitch_ratio: Array,
    arrangement: Array,
    rows: Array,
    prandtl_wall: Array | None = None,
    temperature_ratio: Array | None = None,
) -> Array:
    """Mean Nusselt number of a plain bank in a gas, the default.

    Parameters
    ----------
    reynolds : Array
        Re in the narrowest section, on the tube diameter [-].
    prandtl : Array
        Pr of the bulk [-].
    transverse_pitch_ratio, longitudinal_pitch_ratio : Array
        a, b [-].
    arrangement : Array
        1 for staggered, 0 for in-line.
    rows : Array
        n [-].
    prandtl_wall : Array, optional
        Pr at the surface [-]; left out: no wall correction in ESDU 73031 and Zukauskas 1987.
    temperature_ratio : Array, optional
        Bulk over surface temperature in kelvin [-]; left out: no wall correction in Gnielinski 1979.

    Returns
    -------
    Array
        Nu on the tube diameter, mean over the rows [-].

    Notes
    -----
    ESDU 73031 up to Re 500, Gnielinski 1979 from 1e3 to 1e5, Zukauskas 1987 from 4e5, with smooth passages
    between in ln Nu over ln Re. The joining is this library's own.
    """
    bank = {"reynolds": reynolds, "prandtl": prandtl, "arrangement": arrangement, "rows": rows}
    pitches = {
        "transverse_pitch_ratio": transverse_pitch_ratio,
        "longitudinal_pitch_ratio": longitudinal_pitch_ratio,
    }
    return _mixed(
        _gas_weights(reynolds),
        (
            partial(esdu_73031, **bank, prandtl_wall=prandtl_wall),
            partial(gnielinski_1979, **bank, **pitches, temperature_ratio=temperature_ratio, gas=np.ones(1)),
            partial(zukauskas_1987, **bank, **pitches, prandtl_wall=prandtl_wall),
        ),
    )


@elementwise
def gnielinski_zukauskas_gas_row_share(*, reynolds: Array, **others: Array) -> Array:
    """Local coefficient of a row over the bank's mean: the three laws' shares by weight; their mean is 1."""
    return _shares(_gas_weights(reynolds), {"reynolds": reynolds, **others})


@elementwise
def gnielinski_zukauskas_liquid(
    *,
    reynolds: Array,
    prandtl: Array,
    transverse_pitch_ratio: Array,
    longitudinal_pitch_ratio: Array,
    arrangement: Array,
    rows: Array,
    prandtl_wall: Array | None = None,
) -> Array:
    """Mean Nusselt number of a plain bank in a liquid, the default.

    Parameters
    ----------
    reynolds : Array
        Re in the narrowest section, on the tube diameter [-].
    prandtl : Array
        Pr of the bulk [-].
    transverse_pitch_ratio, longitudinal_pitch_ratio : Array
        a, b [-].
    arrangement : Array
        1 for staggered, 0 for in-line.
    rows : Array
        n [-].
    prandtl_wall : Array, optional
        Pr at the surface [-]; left out: no wall correction.

    Returns
    -------
    Array
        Nu on the tube diameter, mean over the rows [-].

    Notes
    -----
    ESDU 73031 up to Re 500, Gnielinski 1979 from 1e3 to 3e4, Zukauskas 1987 from 1e5; in place of
    Gnielinski 1979 also Zukauskas 1987 for viscous liquids, the passage from Pr 35 to 70. Smooth passages in
    ln Nu over ln Re and ln Pr. The joining is this library's own.
    """
    bank = {"reynolds": reynolds, "prandtl": prandtl, "arrangement": arrangement, "rows": rows}
    pitches = {
        "transverse_pitch_ratio": transverse_pitch_ratio,
        "longitudinal_pitch_ratio": longitudinal_pitch_ratio,
    }
    return _mixed(
        _liquid_weights(reynolds, prandtl),
        (
            partial(esdu_73031, **bank, prandtl_wall=prandtl_wall),
            partial(gnielinski_1979, **bank, **pitches, prandtl_wall=prandtl_wall),
            partial(zukauskas_1987, **bank, **pitches, prandtl_wall=prandtl_wall),
        ),
    )


@elementwise
def gnielinski_zukauskas_liquid_row_share(*, reynolds: Array, prandtl: Array, **others: Array) -> Array:
    """Local coefficient of a row over the bank's mean: the three laws' shares by weight; their mean is 1."""
    return _shares(_liquid_weights(reynolds, prandtl), {"reynolds": reynolds, "prandtl": prandtl, **others})


def _composite(
    *,
    slug: str,
    function: Callable[..., Array],
    row_share: Callable[..., Array],
    options: tuple[str, ...],
    note: str,
    doubt: str,
) -> Method:
    return Method(
        slug=slug,
        role="outside_heat_transfer",
        surfaces=("plain",),
        arrangements=("inline", "staggered"),
        gives="nusselt",
        function=function,
        inputs=(
            "reynolds",
            "prandtl",
            "transverse_pitch_ratio",
            "longitudinal_pitch_ratio",
            "arrangement",
            "rows",
        ),
        options=options,
        limits=(
            Limit(quantity="reynolds", at_least=10.0, at_most=2e6),
            Limit(quantity="prandtl", at_least=0.6, at_most=500.0),
        ),
        derived_limits=(INLINE_SPACING,),
        source=(
            "ESDU 73031, 1973; V. Gnielinski, Int. Chem. Eng. 19 (1979) 380-390; A. Zukauskas, in Handbook "
            "of Single-Phase Convective Heat Transfer, Wiley 1987, ch. 6; joined here"
        ),
        doubt=doubt,
        note=note,
        scatter_fraction=0.15,
        standard_uncertainty_fraction=0.08,
        row_share=row_share,
    )


GNIELINSKI_ZUKAUSKAS_GAS = _composite(
    slug="gnielinski-zukauskas-gas",
    function=gnielinski_zukauskas_gas,
    row_share=gnielinski_zukauskas_gas_row_share,
    options=("prandtl_wall", "temperature_ratio"),
    note=(
        "Default for gases. esdu-73031 up to Re 500, gnielinski-1979 from 1e3 to 1e5, zukauskas-1987 from "
        "4e5; between them ln Nu passes smoothly (cubic step in ln Re). In the middle range gnielinski-1979 "
        "over zukauskas-1987 is 1.00 to 1.07, rms 0.04 to 0.08, extremes 0.88 to 1.26. Scatter as published "
        "for each, 15 %."
    ),
    doubt="Below Re 1000 the published methods part by up to 50 %; the scatter there is wider than 15 %.",
)

GNIELINSKI_ZUKAUSKAS_LIQUID = _composite(
    slug="gnielinski-zukauskas-liquid",
    function=gnielinski_zukauskas_liquid,
    row_share=gnielinski_zukauskas_liquid_row_share,
    options=("prandtl_wall",),
    note=(
        "Default for liquids. esdu-73031 up to Re 500, gnielinski-1979 from 1e3 to 3e4, zukauskas-1987 from "
        "1e5, and in place of gnielinski-1979 also for viscous liquids (passage from Pr 35 to 70); between "
        "them ln Nu passes smoothly (cubic step in ln Re and ln Pr). Methods differ by 15 % in the middle "
        "range. Scatter as published for each, 15 %."
    ),
    doubt=(
        "Below Re 1000 the published methods part by up to 50 %; the scatter there is wider than 15 %. Of "
        "viscous liquids the wall factor decides most."
    ),
)

RECORDS = (GNIELINSKI_ZUKAUSKAS_GAS, GNIELINSKI_ZUKAUSKAS_LIQUID)


def auto_outside_heat_transfer(
    staggered: bool, transverse_pitch_ratio: float, longitudinal_pitch_ratio: float, gas: bool
) -> str:
    """Slug of the method ``auto`` stands for on a plain bank.

    Parameters
    ----------
    staggered : bool
        Arrangement.
    transverse_pitch_ratio, longitudinal_pitch_ratio : float
        a, b [-].
    gas : bool
        Phase of the outside fluid.

    Returns
    -------
    str
        Chosen by geometry and phase, never by the running Reynolds number. In-line banks with a/b below 0.7
        are covered by no method; ``gnielinski-1979`` answers and says so.
    """
    if not staggered and transverse_pitch_ratio / longitudinal_pitch_ratio < _POOR_SPACING:
        return GNIELINSKI_1979.slug
    return GNIELINSKI_ZUKAUSKAS_GAS.slug if gas else GNIELINSKI_ZUKAUSKAS_LIQUID.slug
