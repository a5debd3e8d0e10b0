"""Rules between members that a schema cannot state, read from the structs themselves."""

from collections.abc import Iterator
from dataclasses import dataclass
from functools import cache
from itertools import pairwise
from typing import Any

import msgspec
from msgspec import Struct

from crossbank.contract._base import Request


@dataclass(frozen=True)
class Broken:
    """One broken rule at one member: a JSON Pointer, what is wrong with it, what was given."""

    pointer: str
    detail: str
    given: float | str | None = None


def broken_rules(request: Struct, pointer: str = "") -> list[Broken]:
    """Every broken rule between the members of a request.

    Parameters
    ----------
    request : Struct
        A struct of the contract.
    pointer : str
        Where it stands in the request; '' for the whole.

    Returns
    -------
    list of Broken
        Either-or groups with none or several given (one entry a member), lists that should be equally long,
        first lists that should rise strictly.
    """
    return list(_walk(request, pointer))


@cache
def _members(kind: type[Struct]) -> tuple[tuple[str, str], ...]:
    return tuple((f.name, f.encode_name) for f in msgspec.structs.fields(kind))


def _walk(value: Any, pointer: str) -> Iterator[Broken]:
    if isinstance(value, Request):
        yield from _exactly_one(value, pointer)
        yield from _same_length(value, pointer)
    if isinstance(value, Struct):
        for name, wire in _members(type(value)):
            member = getattr(value, name)
            if isinstance(member, Struct | list):
                yield from _walk(member, f"{pointer}/{wire}")
    elif isinstance(value, list):
        for index, item in enumerate(value):
            yield from _walk(item, f"{pointer}/{index}")


def _exactly_one(request: Request, pointer: str) -> Iterator[Broken]:
    for group in request.exactly_one:
        found = [name for name in group if getattr(request, name) is not None]
        if len(found) == 1:
            continue
        names = ", ".join(group[:-1]) + " and " + group[-1]
        if found:
            said = f"Give exactly one of {names}; {len(found)} were given."
        else:
            said = f"Give exactly one of {names}; none was given."
        for name in found or group:
            yield Broken(f"{pointer}/{name}", said, getattr(request, name))


def _same_length(request: Request, pointer: str) -> Iterator[Broken]:
    for group in request.same_length:
        first = getattr(request, group[0])
        for name in group[1:]:
            other = getattr(request, name)
            if other is not None and len(other) != len(first):
                said = f"{name} has {len(other)} entries, {group[0]} has {len(first)}; they run side by side."
                yield Broken(f"{pointer}/{name}", said)
        for index, (low, high) in enumerate(pairwise(first)):
            if not low < high:
                said = f"{group[0]} is to rise from entry to entry; {high:g} follows {low:g}."
                yield Broken(f"{pointer}/{group[0]}/{index + 1}", said, high)
