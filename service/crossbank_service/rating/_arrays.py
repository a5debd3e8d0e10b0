"""Frozen dataclasses of arrays whose first axis is the case."""

from dataclasses import fields
from functools import cache
from typing import Any, Self

import numpy as np
from numpy.typing import NDArray

Array = NDArray[np.float64]
Index = NDArray[np.intp]
Mask = NDArray[np.bool_]


class Cases:
    """Mixin for a dataclass whose members are arrays (or None, or such dataclasses), case axis first."""

    def take(self, index: Index | slice) -> Self:
        """The same members for a selection of the cases."""
        return type(self)(*(_take(getattr(self, name), index) for name in _names(type(self))))

    def each(self, n: int) -> list[Self]:
        """The cases one by one, as views."""
        columns = [_each(getattr(self, name), n) for name in _names(type(self))]
        return [type(self)(*members) for members in zip(*columns, strict=True)]

    def put(self, index: Index, other: Self) -> None:
        """Write the cases of ``other`` at ``index`` of this one's arrays, in place."""
        for name in _names(type(self)):
            mine, theirs = getattr(self, name), getattr(other, name)
            if isinstance(mine, Cases):
                mine.put(index, theirs)
            elif isinstance(mine, np.ndarray):
                mine[index] = theirs

    def blank(self, n: int) -> Self:
        """Members of the same kind with room for ``n`` cases."""
        return type(self)(*(_blank(getattr(self, name), n) for name in _names(type(self))))


@cache
def _names_of(kind: Any) -> tuple[str, ...]:
    return tuple(f.name for f in fields(kind))


def _names(kind: Any) -> tuple[str, ...]:
    return _names_of(kind)


def _take(value: Any, index: Index | slice) -> Any:
    if isinstance(value, np.ndarray):
        return value[index]
    if isinstance(value, tuple):
        return tuple(_take(each, index) for each in value)
    return value.take(index) if hasattr(value, "take") else value


def _each(value: Any, n: int) -> Any:
    if isinstance(value, np.ndarray):
        return list(value[:, None])
    if value is None or not isinstance(value, Cases):
        return [value] * n
    return value.each(n)


def _blank(value: Any, n: int) -> Any:
    if isinstance(value, np.ndarray):
        return np.empty((n, *value.shape[1:]), dtype=value.dtype)
    return value.blank(n) if isinstance(value, Cases) else value


def spread(values: Array, like: Array) -> Array:
    """Per-case values (N,) shaped to broadcast against an array (N, ...)."""
    return values.reshape(values.shape[0], *([1] * (like.ndim - 1)))
