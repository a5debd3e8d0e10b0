"""Both clients over a transport without a network: requests, answers, retries, errors."""

import array
import asyncio
import json
import time
from collections.abc import Callable
from datetime import UTC, datetime, timedelta
from email.utils import format_datetime
from typing import Any

import anyio
import httpx
import msgspec
import pytest

import crossbank
from crossbank import AsyncClient, Client, calls, errors
from crossbank import _exchange as exchange_module
from crossbank._exchange import backoff_s, retry_after_s
from crossbank.contract import RateRequest
from crossbank.contract.problem import CODES

Handler = Callable[[httpx.Request], httpx.Response]


class Both:
    """Calls a method of the sync or the async client, whichever a test runs with."""

    def __init__(self, kind: str) -> None:
        self.kind = kind
        self.waits: list[float] = []

    def call(
        self, handler: Handler, name: str, *args: Any, options: dict[str, Any] | None = None, **kwargs: Any
    ) -> Any:
        """Make a client over a handler and call one of its methods."""
        transport = httpx.MockTransport(handler)
        if self.kind == "sync":
            with Client("http://mill.test", transport=transport, **(options or {})) as client:
                return getattr(client, name)(*args, **kwargs)

        async def run() -> Any:
            async with AsyncClient("http://mill.test", transport=transport, **(options or {})) as client:
                return await getattr(client, name)(*args, **kwargs)

        return asyncio.run(run())


@pytest.fixture(params=["sync", "async"])
def both(request: pytest.FixtureRequest, monkeypatch: pytest.MonkeyPatch) -> Both:
    """Give each client in turn, with waits noted instead of slept."""
    it = Both(request.param)
    monkeypatch.setattr(time, "sleep", it.waits.append)

    async def sleep(seconds: float) -> None:
        it.waits.append(seconds)

    monkeypatch.setattr(anyio, "sleep", sleep)
    return it


def answer(value: Any, **headers: str) -> httpx.Response:
    """Give a JSON answer."""
    return httpx.Response(
        200, content=msgspec.json.encode(value), headers={"content-type": "application/json"} | headers
    )


def problem(status: int, code: str, **headers: str) -> httpx.Response:
    """Give a problem document."""
    body = {"type": f"/problems/{code}", "title": "No.", "status": status, "code": code, "detail": "Because."}
    return httpx.Response(
        status,
        content=json.dumps(body).encode(),
        headers={"content-type": "application/problem+json"}
        | {k.replace("_", "-"): v for k, v in headers.items()},
    )


def test_rate_sends_the_members_and_reads_the_result(
    both: Both, body: dict[str, Any], result: dict[str, Any]
) -> None:
    """Keyword arguments become the body; what was not given is not sent."""
    seen: list[httpx.Request] = []

    def handler(request: httpx.Request) -> httpx.Response:
        seen.append(request)
        return answer(result)

    rated = both.call(handler, "rate", **body, label="heater", options={"api_key": "k-1"})
    assert isinstance(rated, crossbank.RateResult)
    assert rated.duty_w == 10000.0
    (request,) = seen
    assert (request.method, request.url.path) == ("POST", "/v1/rate")
    assert json.loads(request.content) == body | {"label": "heater"}
    assert request.headers["x-api-key"] == "k-1"
    assert request.headers["content-type"] == request.headers["accept"] == "application/json"


def test_structs_and_dicts_are_the_same_request(
    both: Both, body: dict[str, Any], result: dict[str, Any]
) -> None:
    """A struct is sent without the members left at their default, so an older service understands it."""
    seen: list[Any] = []

    def handler(request: httpx.Request) -> httpx.Response:
        seen.append(json.loads(request.content))
        return answer(result)

    request = msgspec.convert(body, RateRequest)
    both.call(handler, "rate_request", request)
    both.call(handler, "rate", bank=request.bank, outside=request.outside, inside=body["inside"])
    assert seen == [body, body]


def test_messagepack_both_ways(both: Both, body: dict[str, Any], result: dict[str, Any]) -> None:
    """By option the body goes and the answer comes as MessagePack."""

    def handler(request: httpx.Request) -> httpx.Response:
        assert request.headers["content-type"] == request.headers["accept"] == "application/vnd.msgpack"
        assert msgspec.msgpack.decode(request.content) == body
        return httpx.Response(
            200, content=msgspec.msgpack.encode(result), headers={"content-type": "application/vnd.msgpack"}
        )

    assert both.call(handler, "rate_request", body, options={"media": "msgpack"}).iterations == 9


def test_the_whole_answer_keeps_the_requests_id(
    both: Both, body: dict[str, Any], result: dict[str, Any]
) -> None:
    """`send` gives the value, the service's id of the request and the bytes as they came."""
    got = both.call(lambda _: answer(result, **{"X-Request-Id": "r-7"}), "send", calls.rate_request(body))
    assert got.request_id == "r-7"
    assert json.loads(got.content) == result
    assert got.value.label == "veneer dryer heater"


@pytest.mark.parametrize(
    ("name", "args", "path", "wire"),
    [
        ("methods", (), "/v1/methods", {"methods": []}),
        ("method", ("zukauskas-1987",), "/v1/methods/zukauskas-1987", {"methods": []}),
        ("method", ("a/b c",), "/v1/methods/a%2Fb%20c", {"methods": []}),
        ("fluids", (), "/v1/fluids", {"fluids": [], "gases": [], "fuels": []}),
        ("materials", (), "/v1/materials", {"materials": []}),
        ("notices", (), "/v1/notices", {"notices": []}),
    ],
)
def test_lists_come_from_their_paths(
    both: Both, name: str, args: tuple[str, ...], path: str, wire: Any
) -> None:
    """Each catalogue call asks its path and gives the list."""

    def handler(request: httpx.Request) -> httpx.Response:
        assert (request.method, request.url.raw_path.decode()) == ("GET", path)
        return answer(wire)

    assert both.call(handler, name, *args) == []


def test_service_tells_its_versions(both: Both) -> None:
    """`service` reads `GET /v1`."""
    wire = {
        "contract": "1",
        "service_version": "0.1.0",
        "numbers": "1",
        "properties": "p",
        "limits": {"body_bytes": 1000},
    }
    assert both.call(lambda _: answer(wire), "service").limits.body_bytes == 1000


def test_evaluate_sends_the_inputs_flat(both: Both) -> None:
    """Inputs go as a flat object; arrays become lists."""
    wire = {
        "method": "m",
        "gives": "nusselt",
        "unit": "",
        "values": [1.0, 2.0],
        "in_range": [True, False],
        "range_note": None,
    }

    def handler(request: httpx.Request) -> httpx.Response:
        assert json.loads(request.content) == {
            "reynolds": [1e3, 1e4],
            "arrangement": "inline",
            "prandtl": 0.7,
        }
        return answer(wire)

    got = both.call(
        handler, "evaluate", "m", reynolds=array.array("d", [1e3, 1e4]), arrangement="inline", prandtl=0.7
    )
    assert got.values == [1.0, 2.0]


@pytest.mark.parametrize(("status", "ready"), [(200, True), (503, False)])
def test_health_is_a_yes_or_no_without_waiting(both: Both, status: int, ready: bool) -> None:
    """A service that is not ready is reported at once."""
    asked: list[str] = []

    def handler(request: httpx.Request) -> httpx.Response:
        asked.append(request.url.path)
        return httpx.Response(status, content=b"whatever")

    assert both.call(handler, "health") is ready
    assert asked == ["/health/ready"]
    assert both.waits == []


@pytest.mark.parametrize("bad", [float("nan"), float("inf")])
def test_not_a_number_is_refused_before_it_is_sent(both: Both, body: dict[str, Any], bad: float) -> None:
    """JSON would turn it into null and the default would be taken: the client refuses, with the pointer."""
    body["outside"]["fouling_m2_k_w"] = bad

    def handler(_: httpx.Request) -> httpx.Response:
        raise AssertionError

    with pytest.raises(errors.NotSent, match="/outside/fouling_m2_k_w"):
        both.call(handler, "rate_request", body)


def test_what_has_no_wire_form_is_refused(both: Both, body: dict[str, Any]) -> None:
    """An object the wire does not know is an error of the caller, said as such."""
    body["outside"]["flow"] = object()
    with pytest.raises(errors.NotSent, match="object"):
        both.call(lambda _: answer({}), "rate_request", body)


@pytest.mark.parametrize("status", [429, 503])
def test_a_busy_service_is_asked_again(
    both: Both, body: dict[str, Any], result: dict[str, Any], status: int
) -> None:
    """429 and 503 are tried again after what Retry-After asks for, at least."""
    replies = [problem(status, "overloaded", retry_after="3"), problem(status, "overloaded"), answer(result)]
    rated = both.call(lambda _: replies.pop(0), "rate_request", body)
    assert rated.iterations == 9
    assert both.waits[0] == 3.0
    assert 0.25 <= both.waits[1] <= 0.5


def test_retries_are_bounded(both: Both, body: dict[str, Any]) -> None:
    """After the last retry the problem is raised."""
    asked: list[None] = []

    def handler(_: httpx.Request) -> httpx.Response:
        asked.append(None)
        return problem(503, "out-of-time", x_request_id="r-9")

    with pytest.raises(errors.OutOfTime) as caught:
        both.call(handler, "rate_request", body, options={"retries": 3})
    assert len(asked) == 4
    assert caught.value.request_id == "r-9"


def test_a_long_retry_after_is_not_waited_for(both: Both, body: dict[str, Any]) -> None:
    """A service that asks for minutes is reported instead."""
    with pytest.raises(errors.TooMany):
        both.call(lambda _: problem(429, "too-many", retry_after="3600"), "rate_request", body)
    assert both.waits == []


@pytest.mark.parametrize("code", ["invalid-input", "impossible", "out-of-range", "not-converged", "internal"])
def test_other_problems_are_raised_at_once(both: Both, body: dict[str, Any], code: str) -> None:
    """What asking again cannot mend is not asked again."""
    status = 500 if code == "internal" else 422
    with pytest.raises(errors.BY_CODE[code]):
        both.call(lambda _: problem(status, code), "rate_request", body)
    assert both.waits == []


def test_a_broken_connection_is_tried_again_then_reported(both: Both, body: dict[str, Any]) -> None:
    """Connections that fail are retried with growing waits."""

    def handler(request: httpx.Request) -> httpx.Response:
        raise httpx.ConnectError("refused", request=request)

    with pytest.raises(errors.ConnectionFailed, match="refused"):
        both.call(handler, "rate_request", body, options={"retries": 2})
    assert len(both.waits) == 2


def test_a_late_answer_is_reported_and_not_asked_again(both: Both, body: dict[str, Any]) -> None:
    """A read timeout is not retried: the calculation would only take as long again."""

    def handler(request: httpx.Request) -> httpx.Response:
        raise httpx.ReadTimeout("", request=request)

    with pytest.raises(errors.TimedOut, match="ReadTimeout"):
        both.call(handler, "rate_request", body)
    assert both.waits == []


@pytest.mark.parametrize(
    ("status", "content", "headers"),
    [
        (200, b"<html>", {"content-type": "text/html"}),
        (200, b"{}", {"content-type": "application/json"}),
        (200, b"{", {"content-type": "application/json"}),
        (200, b"{}", {}),
        (200, b"\xc1", {"content-type": "application/msgpack"}),
        (302, b"", {"location": "/elsewhere"}),
    ],
)
def test_an_answer_that_is_none_is_said_to_be_none(
    both: Both, body: dict[str, Any], status: int, content: bytes, headers: dict[str, str]
) -> None:
    """Answers that are not the contract's are one kind of error, never a decoding fault."""
    with pytest.raises(errors.UnreadableAnswer):
        both.call(lambda _: httpx.Response(status, content=content, headers=headers), "rate_request", body)


@pytest.mark.parametrize("kind", [Client, AsyncClient])
def test_an_address_that_is_none_is_a_value_error(kind: type[Client]) -> None:
    """A base URL that cannot be one is the caller's error, in plain Python terms."""
    with pytest.raises(ValueError, match="base_url"):
        kind("http://mill.test:port")


def test_a_failure_without_a_problem_document_is_still_an_api_error(both: Both, body: dict[str, Any]) -> None:
    """A gateway's own page becomes a server error with the status."""
    reply = httpx.Response(502, content=b"<html>bad gateway", headers={"content-type": "text/html"})
    with pytest.raises(errors.ServerError) as caught:
        both.call(lambda _: reply, "rate_request", body)
    assert (caught.value.status, caught.value.code) == (502, "http-502")


@pytest.mark.parametrize("options", [{"media": "xml"}, {"retries": -1}, {"retries": 11}, {"timeout": 0.0}])
def test_settings_that_make_no_sense_are_refused(both: Both, options: dict[str, Any]) -> None:
    """The constructor names the setting and what it takes."""
    with pytest.raises(ValueError, match=next(iter(options))):
        both.call(lambda _: answer({}), "health", options=options)


@pytest.mark.parametrize(("attempt", "low", "high"), [(0, 0.125, 0.25), (2, 0.5, 1.0), (9, 4.0, 8.0)])
def test_waits_double_and_are_capped(attempt: int, low: float, high: float) -> None:
    """Waits double from a quarter second to eight seconds, spread over their upper half."""
    assert backoff_s(attempt, 0.0) == low
    assert backoff_s(attempt, 1.0) == high


def test_retry_after_reads_seconds_and_dates() -> None:
    """RFC 9110 section 10.2.3: seconds or an HTTP date; nonsense says nothing."""
    now = datetime(2026, 1, 5, 12, 0, 0, tzinfo=UTC)
    assert retry_after_s("7", now) == 7.0
    assert retry_after_s(format_datetime(now + timedelta(seconds=90), usegmt=True), now) == 90.0
    assert retry_after_s(format_datetime(now - timedelta(seconds=90), usegmt=True), now) == 0.0
    assert [retry_after_s(v, now) for v in (None, "soon", "nan", "inf")] == [None] * 4


def test_busy_statuses_are_those_of_the_contract() -> None:
    """What is retried by status is what the contract calls busy."""
    assert {CODES[c][0] for c in ("too-many", "overloaded", "out-of-time")} == set(exchange_module.BUSY)


def test_no_type_of_the_http_library_is_in_a_public_signature() -> None:
    """The HTTP library can be changed without a change for callers."""
    for kind in (Client, AsyncClient):
        for name, member in vars(kind).items():
            if callable(member) and (not name.startswith("_") or name == "__init__"):
                assert "httpx" not in str(member.__annotations__), name
