"""Base classes of the wire structs: closed requests, open results, one rule for null."""

import re
from functools import cache
from typing import Any, ClassVar, TypeVar

import msgspec
from msgspec import NODEFAULT, Struct

T = TypeVar("T")

Pair = tuple[str, ...]


def kebab(name: str) -> str:
    """Tag of a class: its name in lower case, words joined by hyphens (``MoistAir`` -> ``moist-air``)."""
    return re.sub(r"(?<=[a-z0-9])(?=[A-Z])", "-", name).lower()


def default_of(field: msgspec.structs.FieldInfo) -> Any:
    """Default of a field, ``NODEFAULT`` where it is required."""
    if field.default_factory is not NODEFAULT:
        return field.default_factory()
    return field.default


@cache
def _filled(kind: type[Struct]) -> tuple[tuple[str, Any], ...]:
    """Fields whose default is not null, with the default."""
    pairs = ((f.name, default_of(f)) for f in msgspec.structs.fields(kind))
    return tuple(
        (name, default) for name, default in pairs if default is not NODEFAULT and default is not None
    )


class Request(Struct, kw_only=True, frozen=True, forbid_unknown_fields=True, omit_defaults=True):
    """Part of a request: unknown members are refused; null reads as absent where there is a default.

    Attributes
    ----------
    exactly_one : tuple of tuple of str
        Groups of members of which exactly one is to be given.
    same_length : tuple of tuple of str
        Groups of lists that run alongside each other; the first of a group rises strictly.
    """

    exactly_one: ClassVar[tuple[Pair, ...]] = ()
    same_length: ClassVar[tuple[Pair, ...]] = ()

    def __post_init__(self) -> None:
        for name, default in _filled(type(self)):
            if getattr(self, name) is None:
                msgspec.structs.force_setattr(self, name, default)


class Tagged(Request, tag_field="kind", tag=kebab, kw_only=True, frozen=True, forbid_unknown_fields=True):
    """One of several alternatives, told apart by ``kind``."""


class Result(Struct, kw_only=True, frozen=True):
    """Part of an answer: every member is present, members of later versions are ignored."""


def given(x: T | None) -> T:
    """Narrow a member that has a default: it is never null once the struct is built."""
    if x is None:
        raise ValueError("A member with a default is null: the struct was changed after it was built.")
    return x
