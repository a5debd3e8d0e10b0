"""The canonical form of a request and its hash: one walker over the structs, for service and client alike.

Two requests that mean the same have the same hash: `label` and `reference` dropped, shorthands written out,
aliases resolved, members equal to their default left out. A default never changes within a contract version
and the default of a new member means "as before", so hashes outlive releases.
"""

import hashlib
from functools import cache
from typing import Any, NamedTuple, cast

import msgspec
from msgspec import NODEFAULT, Struct
from msgspec.inspect import Metadata, StructType, Type, UnionType, type_info

from crossbank.contract._base import default_of
from crossbank.contract.bank import Bank
from crossbank.contract.names import fluid_slug, material_slug

CONTRACT = "1"

_IDENTITY = frozenset({"label", "reference"})
_RESOLVE = {"fluid": fluid_slug, "material": material_slug}


class _Field(NamedTuple):
    name: str
    wire: str
    default: Any
    names: str | None
    shorthand: type[Struct] | None


def canonical(call: str, request: Struct) -> dict[str, Any]:
    """Canonical form of a request.

    Parameters
    ----------
    call : str
        Last word of the call's path, such as ``rate``.
    request : Struct
        A request struct of the contract.

    Returns
    -------
    dict
        ``{"call", "contract", "request"}``, builtins only.
    """
    return {"call": call, "contract": CONTRACT, "request": _object(request, _IDENTITY)}


def input_sha256(call: str, request: Struct) -> str:
    """SHA-256 of the RFC 8785 form of :func:`canonical`, in hexadecimal."""
    return _sha256(canonical(call, request))


def bank_sha256(bank: Bank) -> str:
    """SHA-256 of the RFC 8785 form of ``{"bank": ...}`` without its condition, in hexadecimal."""
    return _sha256({"bank": _object(bank, frozenset({"condition"}))})


def _sha256(document: dict[str, Any]) -> str:
    try:
        import rfc8785  # noqa: PLC0415  an extra: the thin client does without
    except ImportError as missing:
        raise ImportError("Hashes need the package rfc8785: pip install 'crossbank[hash]'") from missing
    return hashlib.sha256(rfc8785.dumps(document)).hexdigest()


@cache
def _fields(kind: type[Struct]) -> tuple[_Field, ...]:
    types = {f.encode_name: f.type for f in cast("StructType", type_info(kind)).fields}
    out = []
    for info in msgspec.structs.fields(kind):
        extra = _extra(types[info.encode_name])
        out.append(
            _Field(info.name, info.encode_name, default_of(info), extra.get("names"), extra.get("shorthand"))
        )
    return tuple(out)


def _extra(described: Type) -> dict[str, Any]:
    """Metadata of the string alternative of a field."""
    for option in described.types if isinstance(described, UnionType) else (described,):
        if isinstance(option, Metadata) and option.extra:
            return option.extra
    return {}


def _object(struct: Struct, dropped: frozenset[str] = frozenset()) -> dict[str, Any]:
    config = struct.__struct_config__
    out: dict[str, Any] = {}
    if config.tag is not None and config.tag_field is not None:
        out[config.tag_field] = config.tag
    for field in _fields(type(struct)):
        if field.wire in dropped:
            continue
        value = getattr(struct, field.name)
        has_default = field.default is not NODEFAULT
        if value is None and has_default:
            continue
        form = _value(value, field)
        if has_default and form == _value(field.default, field):
            continue
        if form == {} and field.default is not None:
            continue
        out[field.wire] = form
    return out


def _value(value: Any, field: _Field) -> Any:
    if isinstance(value, str) and field.names is not None:
        slug = _RESOLVE[field.names](value)
        return slug if field.shorthand is None else _object(field.shorthand(name=slug))
    if isinstance(value, Struct):
        return _object(value)
    if isinstance(value, list | tuple):
        return [_value(item, field) for item in value]
    return value
