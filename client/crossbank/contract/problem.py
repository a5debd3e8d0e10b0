"""What comes back when a request cannot be answered: a problem document (RFC 9457)."""

from typing import Annotated

from msgspec import Meta, field

from crossbank.contract._base import Result
from crossbank.contract._units import AnyNumber

WholeNumber = Annotated[int, Meta(ge=-(2**63), le=2**63 - 1)]
Status = Annotated[int, Meta(ge=100, le=599)]


class FieldProblem(Result, kw_only=True, frozen=True):
    """One offending member of a request; `pointer` is a JSON Pointer (RFC 6901) into it."""

    pointer: str
    detail: str
    given: bool | WholeNumber | AnyNumber | str | None = None
    unit: str | None = None
    at_least: AnyNumber | None = None
    at_most: AnyNumber | None = None
    one_of: list[str] | None = None


class Problem(Result, kw_only=True, frozen=True):
    """Why there is no answer; `code` is stable, the texts are for people."""

    type: str
    title: str
    status: Status
    code: str
    detail: str | None = None
    errors: list[FieldProblem] = field(default_factory=list)
    request_id: str | None = None


CODES: dict[str, tuple[int, str]] = {
    "malformed": (400, "The body cannot be read"),
    "unauthorized": (401, "A key is needed"),
    "not-found": (404, "Nothing here"),
    "method-not-allowed": (405, "This path does not answer that method"),
    "not-acceptable": (406, "No form of the answer you accept"),
    "too-large": (413, "The body is too large"),
    "unsupported-media": (415, "The body is in a form not read here"),
    "invalid-input": (422, "The request breaks the contract"),
    "impossible": (422, "Geometry or physics contradict themselves"),
    "out-of-range": (422, "A method was asked outside its range"),
    "not-converged": (422, "The solution did not settle"),
    "too-many": (429, "Too many requests"),
    "internal": (500, "The service failed"),
    "overloaded": (503, "The service is busy"),
    "out-of-time": (503, "The calculation took too long"),
}
"""Every code of a problem with its HTTP status and title; the client's errors are keyed by it."""
