"""The bodies of `POST /v1/methods/{slug}`, written from the method records and the nomenclature.

A correlation's inputs, units and bounds stand in its record and in the nomenclature; the closed structs that
check a body are made from there, so that adding a method adds nothing here.
"""

from collections.abc import Iterable
from functools import cache
from typing import Annotated, Any, Literal

import msgspec
import numpy as np
from msgspec import Meta

from crossbank.contract import Evaluation
from crossbank_service.errors import CoreError, Fault, Impossible, InvalidInput
from crossbank_service.methods import METHODS
from crossbank_service.methods.nomenclature import NOMENCLATURE, Quantity
from crossbank_service.methods.ranges import in_range
from crossbank_service.methods.record import Array, Method

MOST_POINTS = 100_000


@cache
def inputs_of(method: Method) -> type[msgspec.Struct]:
    """Give the closed struct of a method's inputs; its options may be left out or null."""
    needed = [(name, _member_type(NOMENCLATURE[name])) for name in method.inputs]
    optional = [(name, _member_type(NOMENCLATURE[name]) | None, None) for name in method.options]
    return _struct(f"Inputs of {method.slug}", [*needed, *optional], f"The inputs of {method.slug}.")


@cache
def all_inputs() -> type[msgspec.Struct]:
    """Give the struct of the inputs of all methods, for the description: each method takes its own."""
    methods = [method for records in METHODS.values() for method in records]
    names = dict.fromkeys(name for method in methods for name in (*method.inputs, *method.options))
    members = [(name, _member_type(NOMENCLATURE[name]) | None, None) for name in names]
    text = (
        "Inputs by name: exactly those that `GET /v1/methods/{slug}` lists. "
        "Each is a number, or lists of equal lengths stand for many points."
    )
    return _struct("MethodInputs", members, text)


def truth(quantity: Quantity) -> bool:
    """Whether a quantity is a yes or no."""
    return quantity.meaning.startswith("true ")


def evaluate(method: Method, asked: msgspec.Struct) -> Evaluation | CoreError:
    """Evaluate a method alone.

    Parameters
    ----------
    method : Method
        The method's record.
    asked : Struct
        Its inputs, as `inputs_of` describes them.

    Returns
    -------
    Evaluation or CoreError
        Numbers for numbers, lists for lists.
    """
    given = {name: value for name, value in msgspec.structs.asdict(asked).items() if value is not None}
    lengths = {name: len(value) for name, value in given.items() if isinstance(value, list)}
    first, points = next(iter(lengths.items()), ("", 1))
    uneven = [
        Fault(
            pointer=f"/{name}",
            detail=f"{name} has {length} elements, {first} has {points}; lists run side by side.",
        )
        for name, length in lengths.items()
        if length != points
    ]
    if uneven:
        return InvalidInput("The lists differ in length.", uneven)
    values = {name: np.broadcast_to(_array(name, value), (points,)) for name, value in given.items()}
    with np.errstate(all="ignore"):
        result = np.broadcast_to(method.function(**values), (points,))
        inside, notes = in_range(method, values)
    if not np.isfinite(result).all():
        point = int(np.flatnonzero(~np.isfinite(result))[0])
        where = f" at point {point}" if lengths else ""
        return Impossible(f"{method.slug} has no finite value{where}; the inputs are too far apart.")
    masks: list[bool] = np.broadcast_to(inside, (points,)).tolist()
    return Evaluation(
        method=method.slug,
        gives=method.gives,
        unit=NOMENCLATURE[method.gives].unit,
        values=result.tolist() if lengths else float(result[0]),
        in_range=masks if lengths else masks[0],
        range_note=list(notes) if lengths else notes[0],
    )


def _array(name: str, value: Any) -> Array:
    words = NOMENCLATURE[name].words
    some = value if isinstance(value, list) else [value]
    return np.array([words.index(v) if words else v for v in some], dtype=np.float64)


def _member_type(quantity: Quantity) -> Any:
    one: Any
    if quantity.words:
        one = Annotated[Literal[quantity.words], Meta(description=quantity.meaning)]
    elif truth(quantity):
        one = Annotated[bool, Meta(description=quantity.meaning)]
    else:
        meta = Meta(
            ge=quantity.at_least,
            le=quantity.at_most,
            description=quantity.meaning,
            extra_json_schema={"x-unit": quantity.unit or "1"},
        )
        one = Annotated[float, meta]
    return one | Annotated[list[one], Meta(min_length=1, max_length=MOST_POINTS)]


def _struct(name: str, members: Iterable[Any], text: str) -> type[msgspec.Struct]:
    return msgspec.defstruct(
        name, members, kw_only=True, frozen=True, forbid_unknown_fields=True, namespace={"__doc__": text}
    )
