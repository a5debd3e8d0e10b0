"""Which correlation each role uses: what the request names, or what ``auto`` stands for."""

from collections.abc import Iterator
from dataclasses import replace

from crossbank.contract import RateRequest, given
from crossbank_service import methods
from crossbank_service.methods import finned_auto
from crossbank_service.methods.record import Method
from crossbank_service.rating._case import Case, InsideKind, SectionInput, SurfaceKind
from crossbank_service.rating._faults import Faults

OUTSIDE = ("outside_heat_transfer", "outside_pressure_drop")
INSIDE = ("inside_heat_transfer", "inside_pressure_drop")
_AUTO_INSIDE = {
    ("inside_heat_transfer", "single-phase"): "gnielinski-1976",
    ("inside_pressure_drop", "single-phase"): "churchill-1977",
    ("inside_heat_transfer", "condensing"): "cavallini-2006",
    ("inside_pressure_drop", "condensing"): "mueller-steinhagen-heck-1986",
}


def method(role: str, slug: str) -> Method:
    """Record of a method in a role."""
    return methods.method(role, slug)


def for_inside(role: str, inside: InsideKind) -> tuple[Method, ...]:
    """All methods that can serve a role for a kind of inside."""
    return tuple(m for m in methods.in_role(role) if inside in m.surfaces)


def for_surface(role: str, kind: SurfaceKind, *, staggered: bool) -> tuple[Method, ...]:
    """All methods that can serve a role for a surface in an arrangement."""
    arrangement = "staggered" if staggered else "inline"
    return tuple(m for m in methods.in_role(role) if kind in m.surfaces and arrangement in m.arrangements)


def choose_inside(request: RateRequest, inside: InsideKind, faults: Faults) -> dict[str, str]:
    """Slug by role inside; empty for a held surface, where no method is asked."""
    chosen: dict[str, str] = {}
    for role in INSIDE:
        slug = given(getattr(given(request.methods), role))
        held = inside == "held-surface"
        fitting = methods.in_role(role) if held else for_inside(role, inside)
        if slug != "auto" and slug not in {m.slug for m in fitting}:
            _unknown(role, slug, fitting, faults)
        if not held:
            chosen[role] = _AUTO_INSIDE[role, inside] if slug == "auto" else slug
    return chosen


def choose_outside(
    request: RateRequest, sections: tuple[SectionInput, ...], *, gas: bool, faults: Faults
) -> tuple[SectionInput, ...]:
    """The sections with their methods.

    A slug of the request serves every row group whose surface it is for; it is refused where it fits none, and
    ``auto`` stands for the rest.
    """
    out = list(sections)
    for role in OUTSIDE:
        slug = given(getattr(given(request.methods), role))
        served = False
        fitting: dict[str, Method] = {}
        for i, section in enumerate(out):
            candidates = for_surface(role, section.kind, staggered=section.bank["staggered"] > 0.0)
            fitting.update({m.slug: m for m in candidates})
            mine = slug in {m.slug for m in candidates}
            served = served or mine
            chosen = slug if mine else _auto(role, section, gas=gas)
            out[i] = _with(section, role, chosen)
        if slug != "auto" and not served:
            _unknown(role, slug, tuple(fitting.values()), faults)
    return tuple(out)


def _auto(role: str, section: SectionInput, *, gas: bool) -> str:
    heat = role == "outside_heat_transfer"
    bank = section.bank
    staggered, d = bank["staggered"] > 0.0, bank["outer_diameter"]
    st, sl = bank["transverse_pitch"], bank["longitudinal_pitch"]
    match section.kind:
        case "plain":
            if heat:
                return methods.auto_outside_heat_transfer(staggered, st / d, sl / d, gas)
            return methods.auto_outside_pressure_drop()
        case "annular":
            law = finned_auto.auto_annular_heat_transfer if heat else finned_auto.auto_annular_pressure_drop
            welded = section.attachment == "welded"
            return law(staggered=staggered, fin_height_m=section.fins["height"], welded=welded)
        case "serrated":
            return finned_auto.auto_serrated()
        case "plate":
            collar = d + 2.0 * section.fins["thickness"]
            return finned_auto.auto_plate(
                staggered=staggered, diameter_m=collar, transverse_pitch_m=st, longitudinal_pitch_m=sl
            )


def other_methods(case: Case) -> Iterator[tuple[str, str, Case]]:
    """Every other applicable method, one role at a time: role, slug, and the case with it."""
    for role in OUTSIDE:
        slugs = dict.fromkeys(
            m.slug
            for s in case.sections
            for m in for_surface(role, s.kind, staggered=s.bank["staggered"] > 0.0)
        )
        for slug in slugs:
            sections = tuple(_with(s, role, slug) if _serves(role, slug, s) else s for s in case.sections)
            if sections != case.sections:
                yield role, slug, replace(case, sections=sections)
    for role, chosen in case.methods.items():
        for m in for_inside(role, case.inside.kind):
            if m.slug != chosen:
                yield role, m.slug, replace(case, methods={**case.methods, role: m.slug})


def _with(section: SectionInput, role: str, slug: str) -> SectionInput:
    """The section with another method in a role outside."""
    if role == "outside_heat_transfer":
        return replace(section, heat_method=slug)
    return replace(section, drop_method=slug)


def _serves(role: str, slug: str, section: SectionInput) -> bool:
    fitting = for_surface(role, section.kind, staggered=section.bank["staggered"] > 0.0)
    return slug in {m.slug for m in fitting}


def _unknown(role: str, slug: str, fitting: tuple[Method, ...], faults: Faults) -> None:
    faults.reject(
        f"/methods/{role}",
        f"'{slug}' is no method for this bank in this role; /v1/methods lists what each is for.",
        slug,
        one_of=("auto", *(m.slug for m in fitting)),
    )
