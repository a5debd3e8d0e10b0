"""The form of answers and problems: media, headers, ids, determinism."""

import math
from collections.abc import Callable
from typing import Any

import httpx
import msgspec
import pytest

from crossbank.contract import Problem, RateResult
from crossbank.contract.problem import CODES
from crossbank_service import errors, rating
from crossbank_service.http import Settings
from crossbank_service.http.media import negotiate
from crossbank_service.http.problems import Refusal, problem_of

Body = dict[str, Any]


@pytest.mark.parametrize(
    ("accept", "media"),
    [
        ("", "application/json"),
        ("*/*", "application/json"),
        ("application/*", "application/json"),
        ("application/msgpack", "application/msgpack"),
        ("application/vnd.msgpack", "application/msgpack"),
        ("application/json;q=0.1, application/msgpack", "application/msgpack"),
        ("*/*, application/json;q=0", "application/msgpack"),
        ("text/html, application/json;q=0.2", "application/json"),
    ],
)
def test_the_answer_takes_the_form_asked_for(
    service: httpx.Client, body: Body, accept: str, media: str
) -> None:
    """Accept is honoured with its weights; the first spelling of MessagePack is answered."""
    answer = service.post("/v1/rate", json=body, headers={"accept": accept})
    assert answer.status_code == 200
    assert answer.headers["content-type"] == media
    assert "accept" in answer.headers["vary"].lower()
    read = msgspec.json.decode if media == "application/json" else msgspec.msgpack.decode
    assert read(answer.content, type=RateResult).duty_w > 0.0


@pytest.mark.parametrize("accept", ["text/html", "application/json;q=0", "image/*"])
def test_a_form_that_is_not_there_is_refused(service: httpx.Client, body: Body, accept: str) -> None:
    """406, as a problem document."""
    answer = service.post("/v1/rate", json=body, headers={"accept": accept})
    assert answer.status_code == 406
    assert answer.headers["content-type"] == "application/problem+json"


def test_the_most_specific_media_range_decides() -> None:
    """RFC 9110, section 12.5.1: application/json;q=0.1 outweighs */*;q=0.9 for JSON."""
    assert negotiate("*/*;q=0.9, application/json;q=0.1") == "application/msgpack"


@pytest.mark.parametrize(
    ("method", "path", "status", "code"),
    [
        ("GET", "/nothing/here", 404, "not-found"),
        ("GET", "/v1/methods/nobody-1900", 404, "not-found"),
        ("GET", "/v1/rate", 405, "method-not-allowed"),
        ("DELETE", "/v1/fluids", 405, "method-not-allowed"),
        ("POST", "/v1/rate", 415, "unsupported-media"),
    ],
)
def test_every_refusal_is_a_problem_document_with_the_requests_id(
    service: httpx.Client, method: str, path: str, status: int, code: str
) -> None:
    """Also where no route was reached."""
    answer = service.request(method, path, headers={"x-request-id": "my-id.7"})
    assert answer.status_code == status
    assert answer.headers["content-type"] == "application/problem+json"
    assert answer.headers["x-request-id"] == "my-id.7"
    problem = msgspec.json.decode(answer.content, type=Problem)
    assert (problem.code, problem.status, problem.request_id) == (code, status, "my-id.7")
    assert problem.detail
    if status == 405:
        assert answer.headers["allow"]


@pytest.mark.parametrize("chunked", [False, True])
def test_a_body_beyond_the_limit_is_refused(logged: Callable[[Settings], Any], *, chunked: bool) -> None:
    """413, whether or not the length was announced."""
    client = logged(Settings(max_body_bytes=1000)).client
    content: Any = (b" " * 500 for _ in range(4)) if chunked else b" " * 2000
    answer = client.post("/v1/rate", content=content, headers={"content-type": "application/json"})
    assert answer.status_code == 413
    assert answer.json()["code"] == "too-large"


def test_an_unexpected_error_is_logged_and_not_told(
    logged: Callable[[Settings], Any], body: Body, monkeypatch: pytest.MonkeyPatch
) -> None:
    """500 carries the request's id; the text of the error is in the log under it and nowhere else."""

    def broken(_: Any) -> Any:
        raise RuntimeError("a secret of the house")

    service = logged(Settings())
    service.client.post("/v1/rate", json=body)
    monkeypatch.setattr(rating, "rate", broken)
    answer = service.client.post("/v1/rate", json=body)
    assert answer.status_code == 500
    problem = answer.json()
    assert problem["code"] == "internal"
    assert "secret" not in answer.text
    (line,) = service.lines("failure")
    assert line["request_id"] == problem["request_id"] == answer.headers["x-request-id"]
    assert "a secret of the house" in line["exception"]


@pytest.mark.parametrize("value", [math.nan, math.inf, -math.inf])
@pytest.mark.parametrize("accept", ["application/json", "application/msgpack"])
def test_a_number_that_is_none_never_leaves(
    service: httpx.Client, body: Body, monkeypatch: pytest.MonkeyPatch, value: float, accept: str
) -> None:
    """A result that is not finite becomes a problem, never a null or an infinity on the wire."""
    sound = rating.rate

    def unsound(requests: Any) -> Any:
        answers: list[Any] = list(sound(requests))
        return [msgspec.structs.replace(answer, duty_w=value) for answer in answers]

    monkeypatch.setattr(rating, "rate", unsound)
    answer = service.post("/v1/rate", json=body, headers={"accept": accept})
    assert answer.status_code == 500
    assert answer.headers["content-type"] == "application/problem+json"


def test_different_bodies_never_share_an_answer(service: httpx.Client, body: Body) -> None:
    """Nothing between caller and engine keeps answers by path alone."""
    first = service.post("/v1/rate", json=body).json()
    body["outside"]["inlet_temperature_k"] += 5
    second = service.post("/v1/rate", json=body).json()
    assert first["duty_w"] != second["duty_w"]
    assert first["record"]["input_sha256"] != second["record"]["input_sha256"]


def test_equal_bodies_give_equal_bytes(service: httpx.Client, body: Body) -> None:
    """No clock, host or chance in a body, and the timing goes in a header."""
    first, second = (service.post("/v1/rate", json=body) for _ in range(2))
    assert first.content == second.content
    assert first.headers["x-request-id"] != second.headers["x-request-id"]
    assert [part.partition(";")[0] for part in first.headers["server-timing"].split(", ")] == [
        "read",
        "calculate",
        "write",
    ]


@pytest.mark.parametrize("sent", ["", "x" * 65, "white space", "ümlaut", "line\tbreak"])
def test_an_unsound_request_id_is_replaced(service: httpx.Client, sent: str) -> None:
    """Only short plain ids are taken over, so that none can upset the log."""
    answer = service.get("/v1", headers=[(b"x-request-id", sent.encode())])
    assert answer.headers["x-request-id"] != sent
    assert len(answer.headers["x-request-id"]) == 32


@pytest.mark.parametrize("path", ["/health/live", "/health/ready"])
def test_health_answers_head_without_a_body(service: httpx.Client, path: str) -> None:
    """HEAD has the status of GET."""
    service.post("/v1/rate", json={})
    assert service.head(path).status_code == service.get(path).status_code
    assert service.head(path).content == b""


def test_the_catalogues_are_filled(service: httpx.Client) -> None:
    """Each lists what the service works with."""
    for path, member in [
        ("/v1/methods", "methods"),
        ("/v1/fluids", "fluids"),
        ("/v1/materials", "materials"),
        ("/v1/notices", "notices"),
    ]:
        entries = service.get(path).json()[member]
        names = [(entry.get("slug") or entry["code"], entry.get("role")) for entry in entries]
        assert len(names) == len(set(names)) > 5


def test_the_service_says_what_it_is(logged: Callable[[Settings], Any], body: Body) -> None:
    """The versions are those on every result; the limit is the one set."""
    client = logged(Settings(max_body_bytes=12_345)).client
    info = client.get("/v1").json()
    record = client.post("/v1/rate", json=body).json()["record"]
    assert info["limits"] == {"body_bytes": 12_345}
    assert all(info[key] == record[key] for key in ("contract", "service_version", "numbers", "properties"))


def _refusals(base: type[errors.CoreError]) -> list[type[errors.CoreError]]:
    return [base, *(each for below in base.__subclasses__() for each in _refusals(below))]


@pytest.mark.parametrize("kind", _refusals(errors.CoreError))
def test_every_refusal_of_the_core_has_its_problem(kind: type[errors.CoreError]) -> None:
    """The table from errors to problems is total, and only the base itself is unexpected."""
    problem = problem_of(kind("why"), "id")
    assert (problem.status, problem.title) == CODES[kind.code]
    assert problem.status == (500 if kind is errors.CoreError else 422)


@pytest.mark.parametrize("code", CODES)
def test_every_code_of_the_contract_can_be_raised(code: str) -> None:
    """Code, status and title are the contract's."""
    problem = problem_of(Refusal(code, "why"), None)
    assert (problem.code, problem.status, problem.title) == (code, *CODES[code])
