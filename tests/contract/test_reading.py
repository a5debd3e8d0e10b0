"""What the service accepts as a body, and what it says about one it refuses."""

import copy
from typing import Any

import httpx
import msgspec
import pytest

Body = dict[str, Any]
MEDIA = ["application/json", "application/msgpack", "application/vnd.msgpack"]
_ABSENT = object()


def put(body: Body, pointer: str, value: Any) -> Body:
    """Write a member of a copy of the body, or take it away."""
    changed = copy.deepcopy(body)
    *above, name = pointer.strip("/").split("/")
    at = changed
    for step in above:
        at = at[step]
    if value is _ABSENT:
        del at[name]
    else:
        at[name] = value
    return changed


def send(service: httpx.Client, body: Any, media: str = "application/json") -> httpx.Response:
    """Send a body to be rated."""
    encode = msgspec.json.encode if media == "application/json" else msgspec.msgpack.encode
    return service.post("/v1/rate", content=encode(body), headers={"content-type": media})


def only_error(answer: httpx.Response) -> dict[str, Any]:
    """Give the one error of a refusal."""
    assert answer.status_code == 422
    problem = answer.json()
    assert problem["code"] == "invalid-input"
    (error,) = problem["errors"]
    found: dict[str, Any] = error
    return found


@pytest.mark.parametrize("media", MEDIA)
def test_a_sound_body_is_rated_in_every_form(service: httpx.Client, body: Body, media: str) -> None:
    """JSON and both spellings of MessagePack give the same answer."""
    answer = send(service, body, media)
    assert answer.status_code == 200
    assert answer.json() == send(service, body).json()


@pytest.mark.parametrize("media", MEDIA)
@pytest.mark.parametrize(
    ("pointer", "value"),
    [
        ("/outside/inlet_temperature_k", "268.15"),
        ("/bank/layout/rows", "12"),
        ("/bank/layout/rows", True),
        ("/strict", "false"),
        ("/strict", 0),
    ],
)
def test_no_value_is_taken_for_one_of_another_kind(
    service: httpx.Client, body: Body, media: str, pointer: str, value: Any
) -> None:
    """A text that looks like a number is no number, a number is no yes or no."""
    error = only_error(send(service, put(body, pointer, value), media))
    assert error["pointer"] == pointer
    assert error["given"] == value


@pytest.mark.parametrize("media", MEDIA)
def test_a_whole_number_may_be_written_with_a_point(service: httpx.Client, body: Body, media: str) -> None:
    """12.0 rows are 12 rows, as JSON Schema counts."""
    written = send(service, put(body, "/bank/layout/rows", 12.0), media)
    assert written.status_code == 200
    assert written.content == send(service, body, media).content


def test_a_broken_count_is_refused(service: httpx.Client, body: Body) -> None:
    """12.5 rows do not exist."""
    error = only_error(send(service, put(body, "/bank/layout/rows", 12.5)))
    assert error["pointer"] == "/bank/layout/rows"
    assert "whole number" in error["detail"]


@pytest.mark.parametrize(
    "pointer",
    [
        "/surprise",
        "/bank/surprise",
        "/bank/layout/surprise",
        "/outside/fluid/surprise",
        "/outside/flow/surprise",
        "/inside/surprise",
    ],
)
@pytest.mark.parametrize("media", MEDIA)
def test_an_unknown_member_is_refused_where_it_stands(
    service: httpx.Client, body: Body, pointer: str, media: str
) -> None:
    """At any depth, with a pointer to the unknown member itself."""
    error = only_error(send(service, put(body, pointer, 1), media))
    assert error["pointer"] == pointer
    assert error["given"] == 1
    assert error["one_of"]


def test_a_misspelt_member_is_recognised(service: httpx.Client, body: Body) -> None:
    """The refusal asks whether the near name was meant."""
    answer = send(service, put(body, "/bank/layout/row", 3))
    assert "did you mean rows?" in only_error(answer)["detail"]


def test_a_name_is_escaped_in_the_pointer(service: httpx.Client, body: Body) -> None:
    """Slash and tilde are written as RFC 6901 says."""
    body["a/b~c"] = 1
    assert only_error(send(service, body))["pointer"] == "/a~1b~0c"


@pytest.mark.parametrize(
    "pointer", ["/bank", "/bank/tube/outer_diameter_m", "/inside/kind", "/outside/flow/kg_s"]
)
def test_a_missing_member_is_named_where_it_is_missing(
    service: httpx.Client, body: Body, pointer: str
) -> None:
    """The pointer ends in the member that should be there."""
    error = only_error(send(service, put(body, pointer, _ABSENT)))
    assert error["pointer"] == pointer
    assert "is missing" in error["detail"]


@pytest.mark.parametrize(
    ("pointer", "value", "meant"),
    [
        ("/outside/inlet_temperature_k", 25, "298.15 K"),
        ("/outside/inlet_temperature_k", -40.5, "232.65 K"),
        ("/bank/tube/outer_diameter_m", 25.4, "0.0254 m"),
        ("/bank/layout/transverse_pitch_m", 50.8, "0.0508 m"),
        ("/inside/inlet_pressure_pa", 4, "400000 Pa"),
        ("/inside/inlet_pressure_pa", 400, "400000 Pa"),
        ("/outside/fluid/relative_humidity", 80, "0.8"),
    ],
)
def test_a_reading_in_another_unit_is_recognised(
    service: httpx.Client, body: Body, pointer: str, value: float, meant: str
) -> None:
    """Celsius, millimetres, bar, kilopascal and percent: the refusal says what it would be in SI."""
    error = only_error(send(service, put(body, pointer, value)))
    assert error["pointer"] == pointer
    assert error["given"] == value
    assert f"({meant})" in error["detail"]
    assert error["unit"]
    assert error["at_least"] < error["at_most"]


def test_several_faults_are_told_at_once(service: httpx.Client, body: Body) -> None:
    """Whoever corrects a body sees every offending member."""
    body["outside"]["inlet_temperature_k"] = 25
    body["bank"]["tube"]["outer_diameter_m"] = 25.4
    body["bank"]["layout"]["arrangement"] = "Staggered"
    del body["inside"]["kind"]
    problem = send(service, body).json()
    assert {error["pointer"] for error in problem["errors"]} == {
        "/outside/inlet_temperature_k",
        "/bank/tube/outer_diameter_m",
        "/bank/layout/arrangement",
        "/inside/kind",
    }


def test_a_fault_in_a_list_is_told_by_its_index(service: httpx.Client, body: Body) -> None:
    """Indices count from 0."""
    body["bank"]["tube"]["material"] = {
        "name": "own alloy",
        "conductivity_w_m_k": {"temperature_k": [300, 25], "value": [40, 41]},
    }
    error = only_error(send(service, body))
    assert error["pointer"] == "/bank/tube/material/conductivity_w_m_k/temperature_k/1"


def test_the_accepted_words_are_told(service: httpx.Client, body: Body) -> None:
    """A wrong tag comes back with the tags there are."""
    error = only_error(send(service, put(body, "/inside/kind", "condense")))
    assert error["one_of"] == ["held-surface", "condensing", "single-phase"]
    assert "Did you mean condensing?" in error["detail"]


def test_null_stands_for_a_default_and_for_nothing_else(service: httpx.Client, body: Body) -> None:
    """Null for a member with a default is as if it were absent; elsewhere it is refused."""
    assert send(service, put(body, "/strict", None)).content == send(service, body).content
    error = only_error(send(service, put(body, "/bank/layout/rows", None)))
    assert error["pointer"] == "/bank/layout/rows"


@pytest.mark.parametrize("value", [float("nan"), float("inf"), float("-inf"), 1e300, 2**63])
@pytest.mark.parametrize(
    "pointer", ["/outside/inlet_temperature_k", "/bank/layout/rows", "/inside/fouling_m2_k_w"]
)
def test_no_number_beyond_its_bounds_enters(
    service: httpx.Client, body: Body, pointer: str, value: float
) -> None:
    """MessagePack can write not-a-number and infinities; every bound refuses them."""
    error = only_error(send(service, put(body, pointer, value), "application/msgpack"))
    assert error["pointer"] == pointer


def test_a_json_number_beyond_all_floats_is_refused(service: httpx.Client, body: Body) -> None:
    """1e999 is JSON, but no number of this contract."""
    content = msgspec.json.encode(body).replace(b"268.15", b"1e999")
    answer = service.post("/v1/rate", content=content, headers={"content-type": "application/json"})
    assert only_error(answer)["pointer"] == "/outside/inlet_temperature_k"


@pytest.mark.parametrize(
    ("content", "media"),
    [
        (b"", "application/json"),
        (b"{", "application/json"),
        (b'{"label": NaN}', "application/json"),
        (b'{"label": "\xff"}', "application/json"),
        (b"[" * 100_000, "application/json"),
        (b'{"bank":' + b"[" * 5000 + b"]" * 5000 + b"}", "application/json"),
        (b"\xc1", "application/msgpack"),
        (b"\x91" * 5000 + b"\x01", "application/msgpack"),
    ],
)
def test_bytes_that_cannot_be_read_are_malformed(service: httpx.Client, content: bytes, media: str) -> None:
    """What is neither JSON nor MessagePack, or nested beyond reason, is answered with 400."""
    answer = service.post("/v1/rate", content=content, headers={"content-type": media})
    assert answer.status_code == 400
    assert answer.json()["code"] == "malformed"


@pytest.mark.parametrize(
    "headers",
    [
        {"content-type": "text/plain"},
        {"content-type": "application/x-www-form-urlencoded"},
        {"content-type": "application/json; charset=latin-1"},
        {"content-type": "application/json", "content-encoding": "gzip"},
        {},
    ],
)
def test_other_media_types_are_refused(service: httpx.Client, body: Body, headers: dict[str, str]) -> None:
    """Even when the bytes happen to be JSON."""
    answer = service.post("/v1/rate", content=msgspec.json.encode(body), headers=headers)
    assert answer.status_code == 415
    assert answer.json()["code"] == "unsupported-media"
