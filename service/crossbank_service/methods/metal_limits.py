"""Temperatures of tube and fin metal, their limits, and ignition of dust on hot surfaces."""

from dataclasses import dataclass

import numpy as np

from crossbank_service.methods.criterion import Criterion, Trust, Values
from crossbank_service.methods.record import Array

ICE_POINT_K = 273.15


@dataclass(frozen=True, kw_only=True)
class MetalLimit:
    """Highest (and lowest) temperature of a material or of a way of fixing fins.

    Attributes
    ----------
    slug, name : str
        Word of the house, and words for people.
    highest_k : float
        General upper limit [K]; design codes may ask for less.
    lowest_k : float or None
        Below this brittleness has to be asked about [K].
    source, trust, note : str
        Where it is from, how far checked, what limits it.
    """

    slug: str
    name: str
    highest_k: float
    lowest_k: float | None = None
    source: str = "typical published upper limits, not a design code"
    trust: Trust = "memory"
    note: str | None = None


def _metal(
    slug: str, name: str, celsius: float, note: str | None = None, lowest: float | None = None
) -> MetalLimit:
    return MetalLimit(
        slug=slug,
        name=name,
        highest_k=celsius + ICE_POINT_K,
        note=note,
        lowest_k=None if lowest is None else lowest + ICE_POINT_K,
    )


TUBE_METALS = (
    _metal("carbon-steel", "carbon steel", 425.0, "graphitisation; oxidation from about 480 C", -29.0),
    _metal("carbon-half-molybdenum", "C-0.5Mo steel", 455.0, "graphitisation"),
    _metal("chromium-1-molybdenum", "1 to 1.25 Cr-Mo steel", 550.0),
    _metal("chromium-2-molybdenum", "2.25 Cr-Mo steel", 580.0),
    _metal("chromium-5-molybdenum", "5 Cr-Mo steel", 600.0),
    _metal("chromium-9-molybdenum", "9 Cr-Mo steel", 635.0),
    _metal("chromium-9-molybdenum-vanadium", "9 Cr-Mo-V steel", 620.0),
    _metal("stainless-304h", "austenitic 304H, 321H, 347H", 760.0, "strength; oxidation from about 870 C"),
    _metal("stainless-310", "austenitic 310", 1050.0),
    _metal("stainless-430", "ferritic 430, 439", 370.0, "embrittlement near 475 C"),
    _metal("duplex", "duplex stainless steel", 290.0, "embrittlement near 475 C"),
    _metal("copper", "copper", 200.0),
    _metal("admiralty", "admiralty brass", 205.0),
    _metal("copper-nickel-90-10", "90-10 copper-nickel", 300.0),
    _metal("copper-nickel-70-30", "70-30 copper-nickel", 370.0),
    _metal("titanium", "titanium grade 2", 315.0),
    _metal("aluminium", "aluminium tube", 200.0),
    _metal("galvanised-steel", "galvanised steel", 200.0, "the zinc"),
)
"""Limits of tube metal by slug; a material not listed is unassessed unless the caller gives its limit."""

FIN_ATTACHMENTS = (
    _metal("tension-wound", "foot wound on under tension", 130.0, "to 150 C in some makers' data"),
    _metal("overlapped-foot", "overlapped foot", 170.0),
    _metal("extruded", "extruded from a sleeve", 290.0),
    _metal("embedded", "embedded in a groove", 400.0),
    _metal("soldered", "soldered", 150.0),
)
"""Limits of the fin's hold on the tube; welded and brazed fins follow their base metal and filler."""


def metal_limit(slug: str) -> MetalLimit | None:
    """Limit of a tube metal or a fin attachment by its slug; None where the house has none."""
    return next((m for m in (*TUBE_METALS, *FIN_ATTACHMENTS) if m.slug == slug), None)


def face_temperatures_k(
    hot_temperature_k: Values,
    cold_temperature_k: Values,
    hot_resistance: Values,
    wall_resistance: Values,
    cold_resistance: Values,
) -> tuple[Array, Array]:
    """Temperatures of the two faces of a wall between two streams.

    Parameters
    ----------
    hot_temperature_k, cold_temperature_k : array_like
        Local stream temperatures [K]; for the coldest metal the coldest of both, for the hottest the hottest.
    hot_resistance, wall_resistance, cold_resistance : array_like
        Resistances, deposits on a side counted with that side [m2 K/W on one area, or K/W].

    Returns
    -------
    tuple of Array
        Hot face and cold face [K].

    Notes
    -----
    Series of resistances: T = Tc + (Th - Tc) R(cold to face)/R(total). A deposit on the hot side lowers
    both faces. Where all resistances are zero the faces are midway.
    """
    hot, wall, cold = (
        np.asarray(r, dtype=np.float64) for r in (hot_resistance, wall_resistance, cold_resistance)
    )
    total = hot + wall + cold
    none = total <= 0.0
    safe = np.where(none, 1.0, total)
    drop = np.asarray(hot_temperature_k, dtype=np.float64) - cold_temperature_k
    hot_face = cold_temperature_k + drop * np.where(none, 0.5, (cold + wall) / safe)
    cold_face = cold_temperature_k + drop * np.where(none, 0.5, cold / safe)
    return np.asarray(hot_face), np.asarray(cold_face)


def cold_stream_for_face_k(
    face_temperature_k: Values, hot_temperature_k: Values, cold_share: Values
) -> Array:
    """Cold stream temperature that brings a face to a wanted temperature, all else held.

    Parameters
    ----------
    face_temperature_k : array_like
        Wanted temperature of the face [K].
    hot_temperature_k : array_like
        Local temperature of the hot stream [K].
    cold_share : array_like
        Resistance between cold stream and face over the total resistance, 0 to 1.

    Returns
    -------
    Array
        Cold stream temperature [K]: the remedy of preheating the cold stream.
    """
    share = np.minimum(np.asarray(cold_share, dtype=np.float64), 1.0 - 1e-12)
    return np.asarray((face_temperature_k - share * hot_temperature_k) / (1.0 - share))


def hot_stream_for_face_k(
    face_temperature_k: Values, cold_temperature_k: Values, cold_share: Values
) -> Array:
    """Hot stream temperature that brings a face to a wanted temperature, all else held.

    Parameters
    ----------
    face_temperature_k : array_like
        Wanted temperature of the face [K].
    cold_temperature_k : array_like
        Local temperature of the cold stream [K].
    cold_share : array_like
        Resistance between cold stream and face over the total resistance, 0 to 1.

    Returns
    -------
    Array
        Hot stream temperature [K]: the remedy of leaving the gas hotter, or of cooling it before the bank.
    """
    share = np.maximum(np.asarray(cold_share, dtype=np.float64), 1e-12)
    cold = np.asarray(cold_temperature_k, dtype=np.float64)
    return np.asarray(cold + (face_temperature_k - cold) / share)


def cold_share_for_face(
    face_temperature_k: Values, hot_temperature_k: Values, cold_temperature_k: Values
) -> Array:
    """Share of the total resistance that must lie on the cold side of a face for a wanted face temperature.

    Parameters
    ----------
    face_temperature_k : array_like
        Wanted temperature of the face [K].
    hot_temperature_k, cold_temperature_k : array_like
        Local stream temperatures [K].

    Returns
    -------
    Array
        Share from 0 to 1, clipped: at 1 no resistance will do and a stream must change.
    """
    cold = np.asarray(cold_temperature_k, dtype=np.float64)
    drop = np.asarray(hot_temperature_k - cold)
    safe = np.where(np.abs(drop) > 0.0, drop, 1.0)
    return np.asarray(
        np.clip(np.where(np.abs(drop) > 0.0, (face_temperature_k - cold) / safe, 0.0), 0.0, 1.0)
    )


def highest_surface_k(ignition_temperature_k: Values, margin_k: Values = 75.0) -> Array:
    """Hottest surface allowed under a dust layer.

    Parameters
    ----------
    ignition_temperature_k : array_like
        Ignition temperature of a 5 mm layer of the dust [K].
    margin_k : array_like
        Temperature margin [K].

    Returns
    -------
    Array
        Surface temperature [K].

    Notes
    -----
    Ignition temperature less 75 K, as for electrical apparatus among combustible dust (from memory).
    Thicker layers ignite at lower temperatures.
    """
    return np.asarray(np.asarray(ignition_temperature_k, dtype=np.float64) - margin_k)


_TOUCH = (
    "Bare metal at 60 C burns skin within about 5 s, at 65 C within 1 to 2 s: guard every surface "
    "within reach that passes 60 C, or 44 C where contact is long."
)

TUBE_METAL = Criterion(
    slug="tube-metal-margin",
    check="tube-metal-temperature",
    quantity="limit of the material less hottest metal",
    unit="K",
    sense="at-least",
    beyond=0.0,
    near=25.0,
    source="typical published upper limits, not a design code",
    trust="memory",
    needs=("material",),
    caution=_TOUCH,
)
COLD_METAL = Criterion(
    slug="cold-metal-margin",
    check="tube-metal-temperature",
    quantity="coldest metal less temperature at which brittleness has to be asked about",
    unit="K",
    sense="at-least",
    # colder never means beyond: it raises a question of impact testing that the code answers
    beyond=-ICE_POINT_K,
    near=0.0,
    source="impact-test question of carbon steel below -29 C",
    trust="memory",
    needs=("material",),
)
FIN_METAL = Criterion(
    slug="fin-attachment-margin",
    check="fin-temperature",
    quantity="limit of the fin attachment less hottest fin foot",
    unit="K",
    sense="at-least",
    beyond=0.0,
    near=25.0,
    source="makers' general limits of fin attachments",
    trust="memory",
    needs=("attachment",),
)
IGNITION = Criterion(
    slug="dust-layer-ignition",
    check="surface-ignition",
    quantity="ignition temperature of the dust layer less hottest surface",
    unit="K",
    sense="at-least",
    beyond=75.0,
    near=100.0,
    source="75 K below the ignition temperature of a 5 mm layer; the further 25 K are this service's rule",
    trust="memory",
    needs=("ignition temperature",),
    caution=(
        "Wood dust, lint and oil mist on hot tubes ignite, and a thick layer sooner than a thin one: "
        "keep the bank clean and know how a fire in the duct is put out."
    ),
)
CRITERIA = (TUBE_METAL, COLD_METAL, FIN_METAL, IGNITION)
