"""What is written down: one access line a request, one line a calculation, never a body or a key."""

import hashlib
from collections.abc import Callable
from typing import Any

import msgspec
import pytest

from crossbank.contract import RateRequest, canonical, input_sha256
from crossbank_service.http import Settings
from crossbank_service.http.settings import SettingsError

Body = dict[str, Any]
TRACE = "0af7651916cd43dd8448eb211c80319c"


def test_one_access_line_a_request(logged: Callable[[Settings], Any]) -> None:
    """Method, route template, status, duration, id; an unrouted path is not repeated."""
    service = logged(Settings(warm_up=False))
    service.client.get("/v1/methods/zukauskas-1987?role=x", headers={"x-request-id": "one"})
    service.client.get("/secret/path", headers={"x-request-id": "two"})
    service.client.put("/v1/rate", headers={"x-request-id": "three"})
    seen = [
        {k: v for k, v in line.items() if k not in {"timestamp", "ms"}} for line in service.lines("access")
    ]
    assert seen == [
        {
            "event": "access",
            "method": "GET",
            "route": "/v1/methods/{slug}",
            "status": 200,
            "request_id": "one",
        },
        {"event": "access", "method": "GET", "route": "unmatched", "status": 404, "request_id": "two"},
        {"event": "access", "method": "PUT", "route": "unmatched", "status": 405, "request_id": "three"},
    ]
    assert "secret" not in service.stream.getvalue()


def test_neither_body_nor_key_is_written(logged: Callable[[Settings], Any], body: Body) -> None:
    """Not in an access line, not in the line of a refusal."""
    service = logged(Settings(warm_up=False, api_key_sha256=(hashlib.sha256(b"the-key").hexdigest(),)))
    body["label"] = "a confidential label"
    good = service.client.post("/v1/rate", json=body, headers={"x-api-key": "the-key"})
    body["outside"]["inlet_temperature_k"] = "a confidential reading"
    bad = service.client.post("/v1/rate", json=body, headers={"x-api-key": "the-key"})
    assert (good.status_code, bad.status_code) == (200, 422)
    assert "confidential" not in service.stream.getvalue()
    assert "the-key" not in service.stream.getvalue()


def test_a_calculation_can_be_found_again(logged: Callable[[Settings], Any], body: Body) -> None:
    """Hash, reference, headline numbers, notices, id and trace stand on its line."""
    service = logged(Settings(warm_up=False))
    body["reference"] = {"equipment": "H-12", "revision": "C"}
    headers = {"x-request-id": "mine", "traceparent": f"00-{TRACE}-b7ad6b7169203331-01"}
    result = service.client.post("/v1/rate", json=body, headers=headers).json()
    (line,) = service.lines("calculation")
    assert line["call"] == "rate"
    assert line["status"] == 200
    assert line["input_sha256"] == result["record"]["input_sha256"]
    assert line["reference"] == {"equipment": "H-12", "revision": "C"}
    assert line["duty_w"] == result["duty_w"]
    assert line["outside_outlet_temperature_k"] == result["outside"]["outlet_temperature_k"]
    assert line["outside_pressure_drop_pa"] == result["outside"]["pressure_drop_pa"]
    assert line["notices"] == [notice["code"] for notice in result["notices"]]
    assert (line["request_id"], line["trace_id"]) == ("mine", TRACE)
    assert "input" not in line


def test_the_input_is_written_only_when_asked_for(logged: Callable[[Settings], Any], body: Body) -> None:
    """Then it is the canonical form, from which the case can be repeated."""
    service = logged(Settings(warm_up=False, log_input=True))
    service.client.post("/v1/rate", json=body)
    (line,) = service.lines("calculation")
    request = msgspec.convert(body, RateRequest)
    assert line["input"] == canonical("rate", request)["request"]
    assert line["input_sha256"] == input_sha256("rate", msgspec.convert(line["input"], RateRequest))


def test_a_refused_calculation_is_written_too(logged: Callable[[Settings], Any], body: Body) -> None:
    """With its code and the pointers of the offending members."""
    service = logged(Settings(warm_up=False))
    body["bank"]["layout"]["rows"] = 0
    service.client.post("/v1/rate", json=body)
    (line,) = service.lines("calculation")
    assert (line["status"], line["code"], line["pointers"]) == (422, "invalid-input", ["/bank/layout/rows"])


def test_keys_open_the_service_and_nothing_else_does(logged: Callable[[Settings], Any], body: Body) -> None:
    """Health and description stay public; a wrong key is answered with 401 and a challenge."""
    digests = tuple(hashlib.sha256(key).hexdigest() for key in (b"first", b"second"))
    client = logged(Settings(api_key_sha256=digests)).client
    for headers in ({}, {"x-api-key": "third"}, {"x-api-key": digests[0]}):
        answer = client.post("/v1/rate", json=body, headers=headers)
        assert answer.status_code == 401
        assert answer.json()["code"] == "unauthorized"
        assert answer.headers["www-authenticate"].startswith("ApiKey")
    for key in ("first", "second"):
        assert client.post("/v1/rate", json=body, headers={"x-api-key": key}).status_code == 200
    document = client.get("/openapi.json").json()
    assert document["paths"]["/v1/rate"]["post"]["security"] == [{"key": []}]
    assert "401" in document["paths"]["/v1/rate"]["post"]["responses"]
    assert client.get("/docs").status_code == client.get("/health/live").status_code == 200


def test_settings_come_from_the_environment() -> None:
    """Each by its name in capitals; defaults stand in for what is not set."""
    environment = {
        "CROSSBANK_MAX_BODY_BYTES": "1000",
        "CROSSBANK_LOG_INPUT": "on",
        "CROSSBANK_API_KEY_SHA256": f"{'a' * 64}, {'B' * 64}",
        "CROSSBANK_SERVICE_HOST": "10.0.0.1",
        "CROSSBANK_PORT_8000_TCP": "tcp://10.0.0.1:8000",
        "PATH": "/bin",
    }
    assert Settings.from_environment(environment, log="stdout") == Settings(
        max_body_bytes=1000, log_input=True, api_key_sha256=("a" * 64, "b" * 64), log="stdout"
    )


@pytest.mark.parametrize(
    ("variable", "text"),
    [
        ("CROSSBANK_MAX_BODY_BYTES", "0"),
        ("CROSSBANK_MAX_BODY_BYTES", "2 MB"),
        ("CROSSBANK_LOG_INPUT", "yes"),
        ("CROSSBANK_LOG", "syslog"),
        ("CROSSBANK_API_KEY_SHA256", "not-a-digest"),
        ("CROSSBANK_LOGS", "stdout"),
    ],
)
def test_an_unusable_setting_is_refused_by_name(variable: str, text: str) -> None:
    """A key written where its digest belongs is not repeated in the message."""
    with pytest.raises(SettingsError, match=variable) as caught:
        Settings.from_environment({variable: text})
    assert "not-a-digest" not in str(caught.value)
