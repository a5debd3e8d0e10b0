"""Whether a method is asked within its published range, and a sentence that says why not."""

from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass
from typing import overload

import numpy as np
from numpy.typing import ArrayLike

from crossbank_service.methods.nomenclature import NOMENCLATURE
from crossbank_service.methods.record import Array, DerivedLimit, Limit, Mask, Method

# Limits are closed; a value computed by another route may miss one by rounding.
_ROUNDING = 1e-9


@dataclass(frozen=True)
class _Breach:
    """One side of one limit: the quantity's name and unit, its values, where they lie beyond, the limit."""

    name: str
    unit: str
    value: Array
    beyond: Mask
    word: str
    limit: float

    def sentence(self, case: int) -> str:
        """Say which values of a case lie beyond the limit."""
        wrong = self.value[case][self.beyond[case]]
        least, most = _number(float(wrong.min())), _number(float(wrong.max()))
        spread = least if least == most else f"{least} to {most}"
        return f"{self.name} {self._with_unit(spread)} is {self.word} {self._with_unit(_number(self.limit))}"

    def _with_unit(self, text: str) -> str:
        return f"{text} {self.unit}" if self.unit else text


class RangeNotes(Sequence[str | None]):
    """One sentence for each case, or None where the case is within; built only when asked for."""

    def __init__(self, slug: str, breaches: tuple[_Breach, ...], cases: int) -> None:
        self._slug = slug
        self._cases = cases
        self._breaches: list[tuple[_Breach, Mask]]
        # Whether any place of a case lies beyond, one array of truth for each breach that occurs at all.
        self._breaches = [
            (breach, np.asarray(breach.beyond.reshape(cases, -1).any(axis=1)))
            for breach in breaches
            if breach.beyond.any()
        ]

    def __len__(self) -> int:
        return self._cases

    @overload
    def __getitem__(self, index: int) -> str | None: ...

    @overload
    def __getitem__(self, index: slice) -> Sequence[str | None]: ...

    def __getitem__(self, index: int | slice) -> str | Sequence[str | None] | None:
        if isinstance(index, slice):
            return [self[case] for case in range(*index.indices(self._cases))]
        if not -self._cases <= index < self._cases:
            raise IndexError(f"case {index} of {self._cases}")
        parts = [breach.sentence(index) for breach, occurs in self._breaches if occurs[index]]
        return f"Outside the range of {self._slug}: {'; '.join(parts)}." if parts else None


def in_range(method: Method, values: Mapping[str, ArrayLike]) -> tuple[Mask, RangeNotes]:
    """Where the method's published range holds.

    Parameters
    ----------
    method : Method
        The record asked about.
    values : mapping of str to array-like
        Quantities by their names in the nomenclature, arrays that broadcast together, case axis first. At
        least the method's inputs; a quantity that a limit names and that is not given is not judged, and more
        quantities than these do no harm.

    Returns
    -------
    tuple
        Array of truth of the broadcast shape, and the sentences by case (the first axis).
    """
    quantities = {name: np.asarray(value, dtype=np.float64) for name, value in values.items()}
    shape = np.broadcast_shapes(*(quantity.shape for quantity in quantities.values()))
    spread: tuple[int, ...] = shape or (1,)
    breaches = tuple(_breaches(method, quantities, spread))
    within: Mask = np.ones(spread, dtype=np.bool_)
    for breach in breaches:
        within &= ~breach.beyond
    return within.reshape(shape), RangeNotes(method.slug, breaches, spread[0])


def _breaches(method: Method, quantities: Mapping[str, Array], shape: tuple[int, ...]) -> Iterator[_Breach]:
    for limit in method.limits:
        if limit.quantity in quantities:
            yield from _sides(
                name=_words(limit.quantity),
                unit=NOMENCLATURE[limit.quantity].unit,
                value=quantities[limit.quantity],
                limit=limit,
                quantities=quantities,
                shape=shape,
            )
    for derived in method.derived_limits:
        value = np.asarray(derived.value(**quantities))
        yield from _sides(
            name=derived.name, unit="", value=value, limit=derived, quantities=quantities, shape=shape
        )


def _sides(
    *,
    name: str,
    unit: str,
    value: Array,
    limit: Limit | DerivedLimit,
    quantities: Mapping[str, Array],
    shape: tuple[int, ...],
) -> Iterator[_Breach]:
    applies = _applies(limit.arrangement, quantities)
    slack = _ROUNDING * np.abs(value)
    spread = np.broadcast_to(value, shape)
    if limit.at_least is not None:
        below = np.broadcast_to(applies & (value + slack < limit.at_least), shape)
        yield _Breach(name, unit, spread, below, "below", limit.at_least)
    if limit.at_most is not None:
        above = np.broadcast_to(applies & (value - slack > limit.at_most), shape)
        yield _Breach(name, unit, spread, above, "above", limit.at_most)


def _applies(arrangement: str | None, quantities: Mapping[str, Array]) -> Mask:
    """Where a limit counts; one that names an arrangement counts nowhere if the arrangement is not given."""
    if arrangement is None:
        return np.ones((), dtype=np.bool_)
    if "arrangement" not in quantities:
        return np.zeros((), dtype=np.bool_)
    staggered: Mask = quantities["arrangement"] > 0.5
    return staggered if arrangement == "staggered" else ~staggered


def _words(name: str) -> str:
    """Write a quantity's name as words, without the unit that ends it."""
    for ending in ("_kg_m2_s", "_w_m2_k", "_m", "_k"):
        if name.endswith(ending):
            return name.removesuffix(ending).replace("_", " ")
    return name.replace("_", " ").replace("reynolds", "Reynolds number").replace("prandtl", "Prandtl number")


def _number(value: float) -> str:
    return f"{value:.4g}"
