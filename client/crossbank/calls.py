"""The calls of the service as values: what is sent where, and what comes back.

``Client.send`` and ``AsyncClient.send`` take any of them and return an :class:`Answer`; the clients' named
methods are short forms of that.
"""

from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from typing import Any, Generic, TypeVar
from urllib.parse import quote

from msgspec import Struct

from crossbank.contract import (
    Bank,
    Condensing,
    Detail,
    Evaluation,
    FluidRecords,
    HeldSurface,
    MaterialRecords,
    MethodChoice,
    MethodRecords,
    NoticeRecords,
    Outside,
    RateRequest,
    RateResult,
    Reference,
    ServiceInfo,
    SinglePhase,
)

T = TypeVar("T")

Plain = Mapping[str, Any]
MethodValue = float | bool | str | Sequence[float] | Sequence[bool] | Sequence[str]


@dataclass(frozen=True)
class Call(Generic[T]):
    """One call: HTTP method, path, type of the answer, body."""

    method: str
    path: str
    gives: type[T]
    body: Struct | Plain | None = None
    patient: bool = True
    """Whether a busy service is asked again."""


@dataclass(frozen=True)
class Answer(Generic[T]):
    """What came back: the value, the service's id of the request, and the bytes as they came."""

    value: T
    request_id: str | None
    content: bytes
    media: str


def service() -> Call[ServiceInfo]:
    """``GET /v1``: versions and limits of the service."""
    return Call("GET", "/v1", ServiceInfo)


def rate_request(request: RateRequest | Plain) -> Call[RateResult]:
    """``POST /v1/rate``: one bank in one state, as one body."""
    return Call("POST", "/v1/rate", RateResult, request)


def rate(
    *,
    bank: Bank | Plain,
    outside: Outside | Plain,
    inside: HeldSurface | Condensing | SinglePhase | Plain,
    methods: MethodChoice | Plain | None = None,
    detail: Detail | Plain | None = None,
    label: str | None = None,
    reference: Reference | Plain | None = None,
    strict: bool | None = None,
) -> Call[RateResult]:
    """``POST /v1/rate``: one bank in one state, member by member."""
    optional = {
        "methods": methods,
        "detail": detail,
        "label": label,
        "reference": reference,
        "strict": strict,
    }
    body = {"bank": bank, "outside": outside, "inside": inside}
    return rate_request(body | {name: value for name, value in optional.items() if value is not None})


def methods() -> Call[MethodRecords]:
    """``GET /v1/methods``: the correlations the service knows."""
    return Call("GET", "/v1/methods", MethodRecords)


def method(slug: str) -> Call[MethodRecords]:
    """``GET /v1/methods/{slug}``: one correlation (a record a role)."""
    return Call("GET", f"/v1/methods/{quote(slug, safe='')}", MethodRecords)


def evaluate(slug: str, inputs: Mapping[str, MethodValue]) -> Call[Evaluation]:
    """``POST /v1/methods/{slug}``: one correlation alone, on numbers or lists of equal length."""
    return Call("POST", f"/v1/methods/{quote(slug, safe='')}", Evaluation, dict(inputs))


def fluids() -> Call[FluidRecords]:
    """``GET /v1/fluids``: the fluids the service knows."""
    return Call("GET", "/v1/fluids", FluidRecords)


def materials() -> Call[MaterialRecords]:
    """``GET /v1/materials``: the materials the service knows."""
    return Call("GET", "/v1/materials", MaterialRecords)


def notices() -> Call[NoticeRecords]:
    """``GET /v1/notices``: everything a result can draw attention to."""
    return Call("GET", "/v1/notices", NoticeRecords)


def health() -> Call[object]:
    """``GET /health/ready``: whether the service takes work; the body does not matter."""
    return Call("GET", "/health/ready", object, patient=False)
