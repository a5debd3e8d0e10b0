"""The words that this service accepts where the contract says only "a slug": for the description.

Which fluids, materials and methods there are is the service's knowledge, not the contract's.
"""

from collections.abc import Iterator
from typing import Any

from msgspec import inspect

from crossbank.contract import MethodChoice, Solution
from crossbank.contract.names import FLUID_ALIASES, MATERIAL_ALIASES
from crossbank_service.methods import in_role
from crossbank_service.properties import fluid_records, material_records


def add_words(schemas: dict[str, Any], body_type: Any) -> None:
    """Write the accepted words into the schemas of a request.

    Parameters
    ----------
    schemas : dict
        Schemas by the name of their struct; changed in place.
    body_type : type
        The request.
    """
    for struct in _structs(inspect.type_info(body_type), set()):
        for field in struct.fields:
            words = _words(struct, field)
            if words:
                text = _text_branch(schemas[struct.cls.__name__]["properties"][field.encode_name])
                text.pop("minLength", None)
                text.pop("maxLength", None)
                text["enum"] = words


def _structs(tp: inspect.Type, seen: set[type]) -> Iterator[inspect.StructType]:
    if isinstance(tp, inspect.Metadata):
        yield from _structs(tp.type, seen)
    elif isinstance(tp, inspect.UnionType):
        for branch in tp.types:
            yield from _structs(branch, seen)
    elif isinstance(tp, inspect.ListType):
        yield from _structs(tp.item_type, seen)
    elif isinstance(tp, inspect.StructType) and tp.cls not in seen:
        seen.add(tp.cls)
        yield tp
        for field in tp.fields:
            yield from _structs(field.type, seen)


def _words(struct: inspect.StructType, field: inspect.Field) -> list[str]:
    if struct.cls is MethodChoice:
        return ["auto", *(method.slug for method in in_role(field.encode_name))]
    names = _names(field.type)
    if names == "material":
        return _with_aliases([material.slug for material in material_records()], MATERIAL_ALIASES)
    if names == "fluid":
        kind = "solution" if struct.cls is Solution else "pure"
        return _with_aliases([fluid.slug for fluid in fluid_records() if fluid.kind == kind], FLUID_ALIASES)
    return []


def _names(tp: inspect.Type) -> str | None:
    if isinstance(tp, inspect.Metadata):
        names = (tp.extra or {}).get("names")
        return str(names) if names is not None else _names(tp.type)
    if isinstance(tp, inspect.UnionType):
        return next((names for names in map(_names, tp.types) if names is not None), None)
    return None


def _with_aliases(slugs: list[str], aliases: dict[str, str]) -> list[str]:
    return [*slugs, *(alias for alias, slug in aliases.items() if slug in slugs)]


def _text_branch(schema: dict[str, Any]) -> dict[str, Any]:
    branches = [schema, *schema.get("anyOf", ())]
    return next(branch for branch in branches if branch.get("type") == "string")
