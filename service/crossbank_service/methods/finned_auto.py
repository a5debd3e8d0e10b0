"""What ``auto`` stands for on finned banks: by geometry alone, never by the running Reynolds number."""

from collections.abc import Callable

from crossbank_service.methods import fin_efficiency, fin_efficiency_serrated
from crossbank_service.methods.finned_area_ratio import GANGULI_1985
from crossbank_service.methods.finned_briggs import BRIGGS_YOUNG_LOW_REYNOLDS_BLEND
from crossbank_service.methods.finned_esdu import ESDU_84016, ESDU_84016_DROP, ESDU_86022_DROP
from crossbank_service.methods.finned_plate_gray import GRAY_WEBB_1986
from crossbank_service.methods.finned_plate_wang import WANG_CHI_CHANG_2000
from crossbank_service.methods.finned_serrated import WEIERMAN_1976, WEIERMAN_1976_DROP
from crossbank_service.methods.record import Array

LOW_FIN_HEIGHT_M = 0.003
"""Fins lower than this are low fins (rolled from the tube)."""

_WANG_MOST_DIAMETER = 0.013
_WANG_MOST_PITCH_QUOTIENT = 1.4


def auto_annular_heat_transfer(*, staggered: bool, fin_height_m: float, welded: bool) -> str:
    """Slug of the heat-transfer method ``auto`` stands for on annular fins.

    Parameters
    ----------
    staggered : bool
        Arrangement.
    fin_height_m : float
        Fin height [m].
    welded : bool
        Whether the fins are welded on.

    Returns
    -------
    str
        Welded: ``weierman-1976``. Else in-line ``ganguli-1985``; staggered ``esdu-84016`` for low fins
        (below 3 mm) and ``briggs-young-low-reynolds-blend`` for the rest.
    """
    if welded:
        return WEIERMAN_1976.slug
    if not staggered:
        return GANGULI_1985.slug
    return ESDU_84016.slug if fin_height_m < LOW_FIN_HEIGHT_M else BRIGGS_YOUNG_LOW_REYNOLDS_BLEND.slug


def auto_annular_pressure_drop(*, staggered: bool, fin_height_m: float, welded: bool) -> str:
    """Slug of the pressure-drop method ``auto`` stands for on annular fins.

    Parameters
    ----------
    staggered : bool
        Arrangement.
    fin_height_m : float
        Fin height [m].
    welded : bool
        Whether the fins are welded on.

    Returns
    -------
    str
        Welded or in-line: ``weierman-1976``, the only open law for in-line fins. Else ``esdu-84016`` for
        low fins (below 3 mm) and ``esdu-86022`` for the rest.
    """
    if welded or not staggered:
        return WEIERMAN_1976_DROP.slug
    return ESDU_84016_DROP.slug if fin_height_m < LOW_FIN_HEIGHT_M else ESDU_86022_DROP.slug


def auto_serrated() -> str:
    """Slug ``auto`` stands for on serrated fins, heat transfer and pressure drop: ``weierman-1976``."""
    return WEIERMAN_1976.slug


def auto_plate(
    *, staggered: bool, diameter_m: float, transverse_pitch_m: float, longitudinal_pitch_m: float
) -> str:
    """Slug of the method ``auto`` stands for on plate fins, heat transfer and pressure drop.

    Parameters
    ----------
    staggered : bool
        Arrangement.
    diameter_m : float
        Collar diameter [m].
    transverse_pitch_m, longitudinal_pitch_m : float
        Tube pitches [m].

    Returns
    -------
    str
        ``wang-chi-chang-2000`` for staggered tubes up to 13 mm with P_t/P_l up to 1.4, else
        ``gray-webb-1986``.
    """
    near = transverse_pitch_m <= _WANG_MOST_PITCH_QUOTIENT * longitudinal_pitch_m
    if staggered and near and diameter_m <= _WANG_MOST_DIAMETER:
        return WANG_CHI_CHANG_2000.slug
    return GRAY_WEBB_1986.slug


def fin_efficiency_of(slug: str, surface: str) -> Callable[..., Array]:
    """Fin efficiency a heat-transfer method goes with.

    Parameters
    ----------
    slug : str
        The method of heat transfer.
    surface : str
        ``annular``, ``serrated`` or ``plate``.

    Returns
    -------
    callable
        A function of ``fin_efficiency``: Weierman's own with ``weierman-1976``, otherwise the exact one
        under a uniform coefficient. Mixing them up shifts the overall coefficient by 3 to 8 %.
    """
    if slug == WEIERMAN_1976.slug:
        own = {
            "annular": fin_efficiency_serrated.weierman_solid_efficiency,
            "serrated": fin_efficiency_serrated.weierman_serrated_efficiency,
        }
        if surface in own:
            return own[surface]
    return {
        "annular": fin_efficiency.annular_efficiency,
        "serrated": fin_efficiency_serrated.serrated_efficiency,
        "plate": fin_efficiency.plate_efficiency,
    }[surface]
