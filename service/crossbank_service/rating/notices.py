"""Everything a rating can say beside its numbers: one catalogue of codes, severities and meanings."""

from dataclasses import dataclass

from crossbank.contract import Notice


@dataclass(frozen=True)
class NoticeKind:
    """One notice: stable code, severity (``info``, ``caution``, ``warning``) and what it means."""

    code: str
    severity: str
    meaning: str


_KINDS = (
    NoticeKind(
        "estimate",
        "caution",
        "Results are estimates by published correlations. Local codes and licensed practice decide on pressure "
        "parts, hot surfaces, freezing and corrosion.",
    ),
    NoticeKind(
        "no-flow", "info", "A stream does not flow: no heat is exchanged and nothing is lost in pressure."
    ),
    NoticeKind("no-difference", "info", "Both streams enter at the same temperature: no heat is exchanged."),
    NoticeKind(
        "reverse-heat-flow",
        "caution",
        "The outside stream is at or above the saturation temperature of the vapour inside: nothing condenses.",
    ),
    NoticeKind(
        "inside-boils",
        "caution",
        "The liquid inside reaches saturation, in its bulk or at the wall; it was computed as a liquid.",
    ),
    NoticeKind(
        "outside-boils",
        "caution",
        "The liquid outside reaches saturation, in its bulk or at the wall; it was computed as a liquid.",
    ),
    NoticeKind(
        "gas-condenses",
        "caution",
        "A vapour cools below its saturation temperature, in its bulk or at the wall; it was computed as a gas.",
    ),
    NoticeKind(
        "surface-below-dew-point",
        "caution",
        "The outer surface is colder than the dew point of the outside stream; the surface was computed dry.",
    ),
    NoticeKind(
        "wet-surface",
        "info",
        "Vapour condenses on the outer surface; latent heat and condensate are counted. The pressure drop is that of "
        "the dry surface: between close fins a wet one loses 20 to 60 % more.",
    ),
    NoticeKind(
        "fog",
        "caution",
        "The outside stream becomes supersaturated: part of its vapour turns to fog.",
    ),
    NoticeKind(
        "frost",
        "warning",
        "A surface below the dew point is below freezing: frost will grow. It is not computed; those places are "
        "rated dry and free.",
    ),
    NoticeKind(
        "surface-below-acid-dew-point",
        "caution",
        "The tube metal is colder than the sulfuric acid dew point of the flue gas: it will corrode.",
    ),
    NoticeKind(
        "gas-radiation-ignored",
        "caution",
        "A hot gas with water vapour or carbon dioxide radiates to the tubes; that heat is left out.",
    ),
    NoticeKind(
        "buoyancy",
        "caution",
        "The outside stream is so slow that its own buoyancy moves it; the correlations are for forced convection.",
    ),
    NoticeKind(
        "gas-not-ideal",
        "caution",
        "A gas mixture is notably off the ideal gas it was rated as.",
    ),
    NoticeKind(
        "uneven-stream",
        "caution",
        "The outside stream does not cross the bank evenly: the duty is less, and the streams behind it differ.",
    ),
    NoticeKind(
        "method-out-of-range",
        "caution",
        "A correlation was used outside the range it is published for; its result is an extrapolation.",
    ),
    NoticeKind(
        "method-doubt",
        "caution",
        "Something about a correlation that was used is doubtful, as its record says.",
    ),
    NoticeKind(
        "side-gap-bypass",
        "caution",
        "The gap at the side walls is wider than half a tube gap: part of the stream bypasses the tubes, while "
        "the result takes it as evenly spread.",
    ),
    NoticeKind(
        "property-out-of-range",
        "caution",
        "A wall or stream temperature lies outside the range of a fluid's properties; the edge value was used.",
    ),
    NoticeKind(
        "freezing",
        "warning",
        "A surface that a liquid touches is at or below the liquid's freezing temperature.",
    ),
    NoticeKind(
        "vapour-pressure-exhausted",
        "warning",
        "The vapour loses a large share of its pressure on its way through the tubes.",
    ),
)

NOTICES = {kind.code: kind for kind in _KINDS}


def notice(code: str, text: str | None = None, pointer: str | None = None) -> Notice:
    """A notice of the catalogue, with its own words where the case has more to say."""
    kind = NOTICES[code]
    return Notice(code=code, severity=kind.severity, text=text or kind.meaning, pointer=pointer)
