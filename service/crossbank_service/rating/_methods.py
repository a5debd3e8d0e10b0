"""Which correlation each role uses: what the request names, or what ``auto`` stands for."""

from crossbank.contract import RateRequest, given
from crossbank_service import methods
from crossbank_service.methods.record import Method
from crossbank_service.rating._case import InsideKind
from crossbank_service.rating._faults import Faults

ROLES = ("outside_heat_transfer", "outside_pressure_drop", "inside_heat_transfer", "inside_pressure_drop")
_AUTO_INSIDE = {
    ("inside_heat_transfer", "single-phase"): "gnielinski-1976",
    ("inside_pressure_drop", "single-phase"): "churchill-1977",
    ("inside_heat_transfer", "condensing"): "cavallini-2006",
    ("inside_pressure_drop", "condensing"): "mueller-steinhagen-heck-1986",
}


def method(role: str, slug: str) -> Method:
    """Record of a method in a role."""
    return methods.method(role, slug)


def applicable(role: str, staggered: bool, inside: InsideKind) -> tuple[Method, ...]:
    """All methods that can serve in a role for plain tubes of an arrangement and a kind of inside."""
    if role.startswith("inside"):
        return tuple(m for m in methods.in_role(role) if inside in m.surfaces)
    arrangement = "staggered" if staggered else "inline"
    return tuple(m for m in methods.in_role(role) if "plain" in m.surfaces and arrangement in m.arrangements)


def choose(
    request: RateRequest, staggered: bool, gas: bool, inside: InsideKind, faults: Faults
) -> dict[str, str] | None:
    """Slug by role; roles without meaning for the case are left out."""
    wanted = given(request.methods)
    layout, d = request.bank.layout, request.bank.tube.outer_diameter_m
    chosen: dict[str, str] = {}
    for role in ROLES:
        slug = given(getattr(wanted, role))
        if role.startswith("inside") and inside == "held-surface":
            if slug != "auto" and slug not in {m.slug for m in methods.in_role(role)}:
                _unknown(role, slug, methods.in_role(role), faults)
            continue
        if slug == "auto":
            if role.startswith("inside"):
                slug = _AUTO_INSIDE[role, inside]
            elif role == "outside_pressure_drop":
                slug = methods.auto_outside_pressure_drop()
            else:
                slug = methods.auto_outside_heat_transfer(
                    staggered, layout.transverse_pitch_m / d, layout.longitudinal_pitch_m / d, gas
                )
        fitting = applicable(role, staggered, inside)
        if slug not in {m.slug for m in fitting}:
            _unknown(role, slug, fitting, faults)
        chosen[role] = slug
    return chosen


def _unknown(role: str, slug: str, fitting: tuple[Method, ...], faults: Faults) -> None:
    faults.reject(
        f"/methods/{role}",
        f"'{slug}' is no method for this bank in this role; /v1/methods lists what each is for.",
        slug,
        one_of=("auto", *(m.slug for m in fitting)),
    )
