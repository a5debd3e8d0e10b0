"""What a type of the contract accepts, and what was given, in words for a person."""

from typing import Any

from msgspec import inspect

from crossbank_service.http import hints

EXACT_INTEGER = 2**53
"""From here on a float no longer tells neighbouring integers apart."""

_LONGEST_TEXT = 80
_GREATEST_NUMBER = 1e300  # bound of a number in a problem document; what lies beyond is repeated as text


def bare(tp: inspect.Type) -> inspect.Type:
    """Give the type inside annotations, and the one type that a null may stand in for."""
    while isinstance(tp, inspect.Metadata):
        tp = tp.type
    if isinstance(tp, inspect.UnionType):
        some = [bare(branch) for branch in tp.types if not isinstance(bare(branch), inspect.NoneType)]
        if len(some) == 1:
            return some[0]
    return tp


def unit(tp: inspect.Type) -> str | None:
    """Give the unit a type is annotated with, if any."""
    if isinstance(tp, inspect.Metadata):
        written = (tp.extra_json_schema or {}).get("x-unit")
        return str(written) if written is not None else unit(tp.type)
    if isinstance(tp, inspect.UnionType):
        return next((found for found in map(unit, tp.types) if found is not None), None)
    return None


def bounds(tp: inspect.FloatType | inspect.IntType) -> tuple[float | None, float | None]:
    """Give the least and the greatest number of a type."""
    return (tp.ge if tp.ge is not None else tp.gt), (tp.le if tp.le is not None else tp.lt)


_KINDS: tuple[tuple[type | tuple[type, ...], str], ...] = (
    (inspect.IntType, "a whole number"),
    (inspect.FloatType, "a number"),
    (inspect.StrType, "text"),
    (inspect.LiteralType, "a word"),
    (inspect.BoolType, "true or false"),
    ((inspect.ListType, inspect.VarTupleType), "a list"),
    ((inspect.StructType, inspect.DictType), "an object"),
    (inspect.NoneType, "null"),
)


def kind_words(tp: inspect.Type) -> str:
    """Say what a type accepts, in words."""
    inner = bare(tp)
    if isinstance(inner, inspect.LiteralType):
        return "one of " + ", ".join(map(str, inner.values))
    if isinstance(inner, inspect.UnionType):
        some = [b for b in inner.types if not isinstance(bare(b), inspect.NoneType)]
        return " or ".join(dict.fromkeys(map(kind_words, some)))
    return next((words for kind, words in _KINDS if isinstance(inner, kind)), "a value")


def same_kind(tp: inspect.Type, raw: Any) -> bool:
    """Whether a decoded value is of the kind (object, list, text, number) that a type wants."""
    inner = bare(tp)
    if isinstance(inner, inspect.UnionType):
        return any(same_kind(branch, raw) for branch in inner.types)
    if isinstance(inner, inspect.LiteralType | inspect.StrType):
        return isinstance(raw, str)
    if isinstance(inner, inspect.IntType | inspect.FloatType):
        return isinstance(raw, int | float) and not isinstance(raw, bool)
    if isinstance(inner, inspect.BoolType):
        return isinstance(raw, bool)
    if isinstance(inner, inspect.StructType | inspect.DictType):
        return isinstance(raw, dict)
    if isinstance(inner, inspect.ListType | inspect.VarTupleType):
        return isinstance(raw, list | tuple)
    return isinstance(inner, inspect.NoneType) and raw is None


def noun(raw: Any) -> str:
    """Say what was given, in words."""
    if raw is None:
        return "null"
    if isinstance(raw, bool):
        return "true" if raw else "false"
    if isinstance(raw, str):
        return f'the text "{short(raw)}"'
    if isinstance(raw, int | float):
        return hints.number(raw)
    if isinstance(raw, dict):
        return "an object"
    if isinstance(raw, list | tuple):
        return "a list"
    return "a value that JSON does not have"


def short(text: str) -> str:
    """Cut a text that was given to a length fit for an answer."""
    return text if len(text) <= _LONGEST_TEXT else text[: _LONGEST_TEXT - 1] + "…"


def given(raw: Any) -> float | int | str | None:
    """Give what was given as it may be repeated: a number, text or truth, else None."""
    if isinstance(raw, str):
        return short(raw)
    if isinstance(raw, int):
        return raw if abs(raw) < EXACT_INTEGER else hints.number(raw)
    if isinstance(raw, float):
        return raw if abs(raw) <= _GREATEST_NUMBER else str(raw)
    return None
