"""The request of a rating: one bank in one state."""

from typing import Literal

from crossbank.contract._base import Request
from crossbank.contract._units import Segments, Text, Word
from crossbank.contract.bank import Bank
from crossbank.contract.streams import Inside, Outside


class Reference(Request, kw_only=True, frozen=True):
    """The caller's own identity of a calculation, echoed in the result and the log."""

    equipment: Text | None = None
    revision: Text | None = None
    case: Text | None = None
    order: Text | None = None


class MethodChoice(Request, kw_only=True, frozen=True):
    """Which published correlation to use: `auto` or a slug of `/v1/methods`."""

    outside_heat_transfer: Word | None = "auto"
    outside_pressure_drop: Word | None = "auto"
    inside_heat_transfer: Word | None = "auto"
    inside_pressure_drop: Word | None = "auto"


class Detail(Request, kw_only=True, frozen=True):
    """How finely to compute and what to report.

    `resolution` `row`: local states row by row; `bank`: one set of coefficients and the arrangement's closed
    relation, as hand calculations do. `property_state` other than `local` goes with `bank`. `segments` along
    the tube (null: chosen).
    """

    resolution: Literal["row", "bank"] | None = "row"
    property_state: Literal["local", "inlet", "mean"] | None = "local"
    segments: Segments | None = None
    rows: bool | None = True
    compare_methods: bool | None = False


class RateRequest(Request, kw_only=True, frozen=True):
    """One bank in one state. With `strict` a method outside its range refuses instead of saying so."""

    label: Text | None = None
    reference: Reference | None = None
    bank: Bank
    outside: Outside
    inside: Inside
    methods: MethodChoice | None = MethodChoice()
    detail: Detail | None = Detail()
    strict: bool | None = False
