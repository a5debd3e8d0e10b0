"""Published correlations: pure functions on float arrays, one module a topic, one record a method.

``METHODS`` holds the records by slug, one for each role the slug serves; ``method`` and ``by_slug`` look them
up. A topic module joins by its ``RECORDS``.
"""

from collections.abc import Mapping
from types import MappingProxyType

from crossbank_service.methods import (
    finned_annular,
    finned_plate,
    finned_serrated,
    inside_condensing,
    inside_single_phase,
    inside_two_phase_drop,
    outside_plain_drop,
    outside_plain_heat,
)
from crossbank_service.methods.outside_plain_drop import auto_outside_pressure_drop
from crossbank_service.methods.outside_plain_heat import auto_outside_heat_transfer
from crossbank_service.methods.ranges import in_range
from crossbank_service.methods.record import Array, DerivedLimit, Limit, Method

_TOPICS: tuple[tuple[Method, ...], ...] = (
    outside_plain_heat.RECORDS,
    outside_plain_drop.RECORDS,
    finned_annular.RECORDS,
    finned_serrated.RECORDS,
    finned_plate.RECORDS,
    inside_single_phase.RECORDS,
    inside_condensing.RECORDS,
    inside_two_phase_drop.RECORDS,
)


def _collected() -> Mapping[str, tuple[Method, ...]]:
    found: dict[str, tuple[Method, ...]] = {}
    for records in _TOPICS:
        for record in records:
            others = found.get(record.slug, ())
            if record.role in {other.role for other in others}:
                raise ValueError(f"two records for {record.role} {record.slug}")
            found[record.slug] = (*others, record)
    return MappingProxyType(found)


METHODS: Mapping[str, tuple[Method, ...]] = _collected()


def method(role: str, slug: str) -> Method:
    """Record of a slug in a role.

    Parameters
    ----------
    role, slug : str
        As in the record.

    Returns
    -------
    Method
        The one record.

    Raises
    ------
    KeyError
        If there is none; the message lists the slugs of the role.
    """
    for record in by_slug(slug):
        if record.role == role:
            return record
    known = ", ".join(record.slug for record in in_role(role))
    raise KeyError(f"no method {slug!r} for {role}; there are: {known or 'none'}")


def in_role(role: str) -> tuple[Method, ...]:
    """Every record of a role, in the order in which they are listed."""
    return tuple(record for records in METHODS.values() for record in records if record.role == role)


def by_slug(slug: str) -> tuple[Method, ...]:
    """Every record of a slug, one for each role it serves; empty if there is none."""
    return METHODS.get(slug, ())


__all__ = [
    "METHODS",
    "Array",
    "DerivedLimit",
    "Limit",
    "Method",
    "auto_outside_heat_transfer",
    "auto_outside_pressure_drop",
    "by_slug",
    "in_range",
    "in_role",
    "method",
]
