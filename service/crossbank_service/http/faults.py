"""Says what is wrong with a request body, member by member.

msgspec decides whether a body fits its type, and stops at the first fault. When it refuses, the walk in
this module goes through the body beside the type, finds every offending member and describes it from the
type's own bounds, units and words. Nothing here is a rule of its own.
"""

import re
from collections.abc import Callable, Iterator
from typing import Any, NamedTuple

import msgspec
from msgspec import inspect

from crossbank_service.errors import Fault
from crossbank_service.http import hints, type_words

MOST_FAULTS = 20


def whole(value: Any) -> Any:
    """Turn integral floats into integers, at any depth: JSON Schema counts 60.0 as an integer."""
    if isinstance(value, float):
        return int(value) if value.is_integer() and abs(value) < type_words.EXACT_INTEGER else value
    if isinstance(value, dict):
        return {key: whole(member) for key, member in value.items()}
    if isinstance(value, list):
        return [whole(member) for member in value]
    return value


def find_faults(body_type: Any, raw: Any, refusal: msgspec.ValidationError) -> list[Fault]:
    """List what is wrong with a decoded body that msgspec refused.

    Parameters
    ----------
    body_type : type
        The type the body should fit.
    raw : object
        The body decoded without a type.
    refusal : msgspec.ValidationError
        What msgspec said; used where the walk finds nothing.

    Returns
    -------
    list of Fault
        At least one, at most `MOST_FAULTS`.
    """
    faults: list[Fault] = []
    for fault in _walk(inspect.type_info(body_type), raw, _Place("", "", None)):
        faults.append(fault)
        if len(faults) == MOST_FAULTS:
            break
    if not faults:
        text, _, path = str(refusal).partition(" - at `$")
        faults.append(Fault(pointer=_pointer_of_path(path.rstrip("`")), detail=_sentence(text)))
    return faults


def escape(name: Any) -> str:
    """Write a member's name as a reference token of a JSON Pointer (RFC 6901, section 3)."""
    return str(name).replace("~", "~0").replace("/", "~1")


class _Place(NamedTuple):
    """Where the walk stands: pointer, last member name (for hints) and the unit in force."""

    pointer: str
    name: str
    unit: str | None

    def member(self, name: Any) -> "_Place":
        return _Place(f"{self.pointer}/{escape(name)}", str(name), None)

    def element(self, index: int) -> "_Place":
        return _Place(f"{self.pointer}/{index}", self.name, self.unit)


def _pointer_of_path(path: str) -> str:
    return re.sub(r"\[(\d+|\.\.\.)\]", r"/\1", path).replace(".", "/").replace("/...", "/")


def _sentence(text: str) -> str:
    text = text.strip()
    return text if text.endswith((".", "?", "!")) else text + "."


def _walk(tp: inspect.Type, raw: Any, place: _Place) -> Iterator[Fault]:
    if isinstance(tp, inspect.Metadata):
        unit = (tp.extra_json_schema or {}).get("x-unit", place.unit)
        yield from _walk(tp.type, raw, place._replace(unit=unit))
        return
    for kinds, walk in _WALKS:
        if isinstance(tp, kinds):
            yield from walk(tp, raw, place)
            return


def _walk_bool(_: inspect.BoolType, raw: Any, place: _Place) -> Iterator[Fault]:
    if not isinstance(raw, bool):
        yield _wrong_kind(raw, place, "true or false")


def _walk_null(_: inspect.NoneType, raw: Any, place: _Place) -> Iterator[Fault]:
    if raw is not None:
        yield _wrong_kind(raw, place, "null")


def _walk_literal(tp: inspect.LiteralType, raw: Any, place: _Place) -> Iterator[Fault]:
    yield from _walk_words(tuple(tp.values), raw, place)


def _walk_struct(tp: inspect.StructType, raw: Any, place: _Place) -> Iterator[Fault]:
    if not isinstance(raw, dict):
        yield _wrong_kind(raw, place, "an object")
        return
    sound = True
    known = {field.encode_name: field for field in tp.fields}
    names = [*known, *([tp.tag_field] if tp.tag_field else [])]
    for field in tp.fields:
        if field.encode_name in raw:
            for fault in _walk(field.type, raw[field.encode_name], place.member(field.encode_name)):
                sound = False
                yield fault
        elif field.required:
            sound = False
            yield _missing(field, place.member(field.encode_name))
    unknown = [name for name in raw if name not in names] if tp.forbid_unknown_fields else []
    for name in unknown:
        detail = hints.unknown_member(type_words.short(str(name)), names)
        yield Fault(
            pointer=place.member(name).pointer,
            detail=detail,
            given=type_words.given(raw[name]),
            one_of=tuple(names),
        )
    if sound and not unknown:
        try:
            msgspec.convert(whole(raw), tp.cls)
        except msgspec.ValidationError as refusal:
            # the members are sound one by one: the struct's own rule between them spoke
            text, _, path = str(refusal).partition(" - at `$")
            yield from _own_rule(text, place.pointer + _pointer_of_path(path.rstrip("`")), raw, names)


def _own_rule(text: str, pointer: str, raw: dict[Any, Any], names: list[str]) -> Iterator[Fault]:
    named = [name for name in names if re.search(rf"\b{re.escape(name)}\b", text)]
    if not named:
        yield Fault(pointer=pointer, detail=_sentence(text))
    for name in named:
        yield Fault(
            pointer=f"{pointer}/{name}", detail=_sentence(text), given=type_words.given(raw.get(name))
        )


def _walk_union(tp: inspect.UnionType, raw: Any, place: _Place) -> Iterator[Fault]:
    branches = list(tp.types)
    fitting = [branch for branch in branches if type_words.same_kind(branch, raw)]
    if isinstance(raw, dict):
        structs = [b for b in map(type_words.bare, branches) if isinstance(b, inspect.StructType)]
        if len(structs) > 1:
            yield from _walk_tagged(structs, raw, place)
            return
    if fitting:
        found = [list(_walk(branch, raw, place)) for branch in fitting]
        # of several branches of the same kind (a word or any text), one that fits is enough
        yield from min(found, key=len)
        return
    accepted = [
        type_words.kind_words(branch)
        for branch in branches
        if not isinstance(type_words.bare(branch), inspect.NoneType)
    ]
    unit = next((u for u in map(type_words.unit, branches) if u), place.unit)
    yield _wrong_kind(raw, place._replace(unit=unit), " or ".join(dict.fromkeys(accepted)))


def _walk_tagged(structs: list[inspect.StructType], raw: dict[Any, Any], place: _Place) -> Iterator[Fault]:
    tag_field = structs[0].tag_field or "kind"
    by_tag = {str(struct.tag): struct for struct in structs}
    tag = raw.get(tag_field)
    if isinstance(tag, str) and tag in by_tag:
        yield from _walk_struct(by_tag[tag], raw, place)
        return
    at = place.member(tag_field)
    if tag_field not in raw:
        detail = f"{tag_field} is missing; it says which of these the object is: {', '.join(by_tag)}."
        yield Fault(pointer=at.pointer, detail=detail, one_of=tuple(by_tag))
    else:
        yield from _walk_words(tuple(by_tag), tag, at)


def _walk_number(tp: inspect.FloatType | inspect.IntType, raw: Any, place: _Place) -> Iterator[Fault]:
    integer = isinstance(tp, inspect.IntType)
    if isinstance(raw, bool) or not isinstance(raw, int | float):
        yield _wrong_kind(raw, place, "a whole number" if integer else "a number", type_words.bounds(tp))
        return
    low, high = type_words.bounds(tp)
    below = (tp.ge is not None and not raw >= tp.ge) or (tp.gt is not None and not raw > tp.gt)
    above = (tp.le is not None and not raw <= tp.le) or (tp.lt is not None and not raw < tp.lt)
    fraction = integer and isinstance(raw, float) and not raw.is_integer()
    if below or above or fraction:
        detail = hints.number_out_of_bounds(place.name, raw, place.unit, low, high, integer=integer)
        yield Fault(
            pointer=place.pointer,
            detail=detail,
            given=type_words.given(raw),
            unit=place.unit,
            at_least=low,
            at_most=high,
        )


def _walk_text(tp: inspect.StrType, raw: Any, place: _Place) -> Iterator[Fault]:
    if not isinstance(raw, str):
        yield _wrong_kind(raw, place, "text")
    elif tp.max_length is not None and len(raw) > tp.max_length:
        detail = f"{place.name or 'the text'} may have at most {tp.max_length} characters, not {len(raw)}."
        yield Fault(pointer=place.pointer, detail=detail, given=type_words.given(raw))
    elif tp.min_length is not None and len(raw) < tp.min_length:
        detail = f"{place.name or 'the text'} must have at least {tp.min_length} characters."
        yield Fault(pointer=place.pointer, detail=detail, given=type_words.given(raw))
    elif tp.pattern is not None and not re.search(tp.pattern, raw):
        detail = f"{place.name or 'the text'} must look like {tp.pattern}."
        yield Fault(pointer=place.pointer, detail=detail, given=type_words.given(raw))


def _walk_words(words: tuple[Any, ...], raw: Any, place: _Place) -> Iterator[Fault]:
    if raw in words and not isinstance(raw, bool):
        return
    yield Fault(
        pointer=place.pointer,
        detail=hints.unknown_word(
            place.name, raw if isinstance(raw, str) else None, words, type_words.noun(raw)
        ),
        given=type_words.given(raw),
        one_of=tuple(map(str, words)),
    )


def _walk_list(tp: Any, raw: Any, place: _Place) -> Iterator[Fault]:
    if not isinstance(raw, list | tuple):
        yield _wrong_kind(raw, place, "a list")
        return
    if tp.min_length is not None and len(raw) < tp.min_length:
        detail = f"{place.name or 'the list'} needs at least {tp.min_length} element(s); it has {len(raw)}."
        yield Fault(pointer=place.pointer, detail=detail)
    if tp.max_length is not None and len(raw) > tp.max_length:
        detail = f"{place.name or 'the list'} may have at most {tp.max_length} elements; it has {len(raw)}."
        yield Fault(pointer=place.pointer, detail=detail)
    for index, member in enumerate(raw):
        yield from _walk(tp.item_type, member, place.element(index))


def _walk_dict(tp: inspect.DictType, raw: Any, place: _Place) -> Iterator[Fault]:
    if not isinstance(raw, dict):
        yield _wrong_kind(raw, place, "an object")
        return
    for name, member in raw.items():
        yield from _walk(tp.key_type, name, place.member(name))
        yield from _walk(tp.value_type, member, place.member(name))


# in this order: the first that fits walks
_WALKS: tuple[tuple[tuple[type, ...], Callable[[Any, Any, _Place], Iterator[Fault]]], ...] = (
    ((inspect.UnionType,), _walk_union),
    ((inspect.StructType,), _walk_struct),
    ((inspect.FloatType, inspect.IntType), _walk_number),
    ((inspect.StrType,), _walk_text),
    ((inspect.LiteralType,), _walk_literal),
    ((inspect.ListType, inspect.VarTupleType), _walk_list),
    ((inspect.DictType,), _walk_dict),
    ((inspect.BoolType,), _walk_bool),
    ((inspect.NoneType,), _walk_null),
)


def _missing(field: inspect.Field, place: _Place) -> Fault:
    unit, bare = type_words.unit(field.type), type_words.bare(field.type)
    low, high = (
        type_words.bounds(bare) if isinstance(bare, inspect.FloatType | inspect.IntType) else (None, None)
    )
    words = tuple(map(str, bare.values)) if isinstance(bare, inspect.LiteralType) else None
    accepts = hints.accepted(type_words.kind_words(field.type), unit, low, high)
    return Fault(
        pointer=place.pointer,
        detail=f"{place.name} is missing; write {accepts}.",
        unit=unit,
        at_least=low,
        at_most=high,
        one_of=words,
    )


def _wrong_kind(
    raw: Any, place: _Place, wanted: str, bounds: tuple[float | None, float | None] = (None, None)
) -> Fault:
    text = raw if isinstance(raw, str) else None
    detail = hints.wrong_kind(
        place.name, type_words.noun(raw), text, hints.accepted(wanted, place.unit, *bounds)
    )
    return Fault(
        pointer=place.pointer,
        detail=detail,
        given=type_words.given(raw),
        unit=place.unit,
        at_least=bounds[0],
        at_most=bounds[1],
    )
