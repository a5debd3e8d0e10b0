"""The request structs: what they accept, what they refuse, what they say of themselves."""

from collections.abc import Iterator
from importlib import resources
from typing import Any

import msgspec
import pytest

from crossbank.contract import (
    Bank,
    Circuit,
    Detail,
    Evaluation,
    FluidRecords,
    MaterialRecords,
    MethodChoice,
    MethodRecords,
    MoistAir,
    Problem,
    RateRequest,
    RateResult,
    ServiceInfo,
    given,
)
from crossbank.contract._base import kebab
from crossbank.contract.canonical import _object

ANSWERS = (RateResult, MethodRecords, FluidRecords, MaterialRecords, ServiceInfo, Evaluation, Problem)


def read(body: dict[str, Any]) -> RateRequest:
    """Decode a body as the service does: strictly, from bytes."""
    return msgspec.json.decode(msgspec.json.encode(body), type=RateRequest)


def put(body: dict[str, Any], pointer: str, value: Any) -> None:
    """Set a member by JSON Pointer."""
    *path, last = pointer.strip("/").split("/")
    for name in path:
        body = body.setdefault(name, {})
    body[last] = value


def numbers(schema: Any, where: str = "") -> Iterator[tuple[str, dict[str, Any]]]:
    """Every number of a JSON schema."""
    if isinstance(schema, dict):
        if schema.get("type") in ("number", "integer"):
            yield where, schema
        for name, part in schema.items():
            if name not in ("default", "const", "enum"):
                yield from numbers(part, f"{where}/{name}")
    elif isinstance(schema, list):
        for index, part in enumerate(schema):
            yield from numbers(part, f"{where}/{index}")


def test_absent_members_take_their_defaults(body: dict[str, Any]) -> None:
    """A body of required members only reads with every documented default."""
    request = read(body)
    assert request.bank.circuit == Circuit(passes=1, direction="against", loss_coefficient=None)
    assert request.bank.tube_axis == "horizontal"
    assert request.bank.tube.roughness_m == 4.5e-5
    assert request.outside.fouling_m2_k_w == 0.0
    assert request.methods == MethodChoice()
    assert request.detail == Detail(
        resolution="row", property_state="local", rows=True, compare_methods=False
    )
    assert request.strict is False


@pytest.mark.parametrize(
    "pointer",
    [
        "/label",
        "/reference",
        "/methods",
        "/methods/inside_heat_transfer",
        "/detail",
        "/detail/rows",
        "/strict",
        "/bank/fins",
        "/bank/circuit",
        "/bank/circuit/passes",
        "/bank/circuit/direction",
        "/bank/tube_axis",
        "/bank/tube/roughness_m",
        "/bank/layout/side_gap_m",
        "/outside/fouling_m2_k_w",
        "/outside/elevation_m",
        "/inside/fouling_m2_k_w",
        "/inside/saturation_temperature_k",
    ],
)
def test_null_means_absent_where_there_is_a_default(body: dict[str, Any], pointer: str) -> None:
    """Null and absent read as the same struct."""
    absent = read(body)
    put(body, pointer, None)
    assert read(body) == absent


@pytest.mark.parametrize(
    "pointer",
    [
        "/bank",
        "/bank/layout/rows",
        "/bank/layout/arrangement",
        "/bank/tube/material",
        "/outside/fluid",
        "/outside/flow",
        "/outside/flow/kg_s",
        "/outside/inlet_temperature_k",
        "/inside",
        "/inside/fluid",
    ],
)
def test_null_is_refused_where_there_is_no_default(body: dict[str, Any], pointer: str) -> None:
    """Null for a required member is refused."""
    put(body, pointer, None)
    with pytest.raises(msgspec.ValidationError):
        read(body)


@pytest.mark.parametrize(
    ("pointer", "value"),
    [
        ("/outside/inlet_temperature_k", 25),
        ("/outside/inlet_temperature_k", 2500.1),
        ("/outside/inlet_pressure_pa", 1.013),
        ("/inside/inlet_pressure_pa", 1e9),
        ("/bank/tube/outer_diameter_m", 25.4),
        ("/bank/tube/wall_thickness_m", 2.1),
        ("/bank/layout/transverse_pitch_m", 50.8),
        ("/bank/layout/tube_length_m", 2000),
        ("/bank/layout/rows", 0),
        ("/bank/layout/rows", 1.5),
        ("/bank/layout/rows", 201),
        ("/bank/layout/tubes_per_row", 2001),
        ("/bank/layout/arrangement", "triangular"),
        ("/bank/circuit/passes", 0),
        ("/bank/circuit/direction", "along"),
        ("/bank/tube_axis", "vertical"),
        ("/bank/fins", {"kind": "annular"}),
        ("/outside/flow/kg_s", -1),
        ("/outside/flow/kg_s", "4"),
        ("/outside/flow/kg_s", True),
        ("/outside/fluid/relative_humidity", 80),
        ("/outside/fouling_m2_k_w", 0.2),
        ("/detail/segments", 401),
        ("/strict", 1),
    ],
)
def test_slips_are_refused(body: dict[str, Any], pointer: str, value: Any) -> None:
    """A wrong unit, sign, type or word is refused by the type alone."""
    put(body, pointer, value)
    with pytest.raises(msgspec.ValidationError):
        read(body)


@pytest.mark.parametrize(
    "pointer",
    [
        "/comment",
        "/bank/colour",
        "/bank/layout/row",
        "/bank/tube/diameter_mm",
        "/bank/circuit/rows_per_pass",
        "/outside/fluid/temperature_c",
        "/outside/flow/kg_h",
        "/inside/flow_kg_s",
        "/detail/sensitivities",
        "/solve",
        "/require",
    ],
)
def test_unknown_members_are_refused_at_any_depth(body: dict[str, Any], pointer: str) -> None:
    """A member that does not work, or is misspelt, is refused."""
    put(body, pointer, 1)
    with pytest.raises(msgspec.ValidationError, match="unknown field"):
        read(body)


@pytest.mark.parametrize("codec", [msgspec.json, msgspec.msgpack])
def test_a_request_survives_the_wire(body: dict[str, Any], codec: Any) -> None:
    """Encoding and decoding gives an equal struct, in both forms."""
    request = read(body)
    assert codec.decode(codec.encode(request), type=RateRequest) == request


@pytest.mark.parametrize("value", [float("nan"), float("inf"), float("-inf")])
def test_msgpack_cannot_smuggle_in_what_json_cannot_say(body: dict[str, Any], value: float) -> None:
    """Not-a-number and infinity are refused by the bounds of every number."""
    for pointer in ("/outside/flow/kg_s", "/bank/circuit/loss_coefficient", "/outside/inlet_temperature_k"):
        put(body, pointer, value)
        with pytest.raises(msgspec.ValidationError):
            msgspec.msgpack.decode(msgspec.msgpack.encode(body), type=RateRequest)


def test_every_number_has_both_bounds() -> None:
    """No number of any struct is unbounded, so none can be infinite or not-a-number."""
    _, parts = msgspec.json.schema_components((RateRequest, *ANSWERS))
    found = list(numbers(parts))
    assert len(found) > 100
    assert [where for where, n in found if "minimum" not in n or "maximum" not in n] == []


def test_every_request_number_has_its_unit() -> None:
    """Every number of a request names its unit in the schema, and the member's name ends in it."""
    endings = {
        "K": "_k",
        "Pa": "_pa",
        "m": "_m",
        "kg/s": "kg_s",
        "m3/s": "m3_s",
        "m/s": "m_s",
        "m2 K/W": "_m2_k_w",
    }
    _, parts = msgspec.json.schema_components((RateRequest,))
    for where, number in numbers(parts):
        unit = number["x-unit"]
        name = where.split("/properties/")[-1].split("/")[0]
        if name == "value":  # of a curve: the member that holds the curve ends in the unit
            continue
        assert unit not in endings or name.endswith(endings[unit]), where


def test_requests_are_closed_and_answers_open(result: dict[str, Any]) -> None:
    """Every request struct refuses further members in the schema; an answer may hold more than is known."""
    _, parts = msgspec.json.schema_components((RateRequest,))
    objects = [part for part in parts.values() if part.get("type") == "object"]
    assert objects
    assert all(part["additionalProperties"] is False for part in objects)
    result["outside"]["colour"] = "warm"
    result["inside"]["kind"] = "a-kind-of-tomorrow"
    assert msgspec.convert(result, RateResult).inside.kind == "a-kind-of-tomorrow"


@pytest.mark.parametrize("missing", ["duty_w", "comparisons", "solve"])
def test_every_member_of_an_answer_is_present(result: dict[str, Any], missing: str) -> None:
    """An answer without one of its members is not an answer."""
    del result[missing]
    with pytest.raises(msgspec.ValidationError):
        msgspec.convert(result, RateResult)


def test_an_answer_reads_back_to_the_same_bytes(result: dict[str, Any]) -> None:
    """Names on the wire are those of the contract, `pass` of a row included."""
    wire = msgspec.json.encode(msgspec.convert(result, RateResult))
    assert msgspec.json.decode(wire) == result


def test_tags_are_words_joined_by_hyphens() -> None:
    """The tag of an alternative is its class name in words."""
    assert kebab("MoistAir") == "moist-air"
    assert kebab("Mass") == "mass"
    assert msgspec.to_builtins(MoistAir(relative_humidity=0.5)) == {
        "kind": "moist-air",
        "relative_humidity": 0.5,
    }


def test_given_narrows_and_refuses_null() -> None:
    """`given` returns what is there and refuses null."""
    assert given(0.0) == 0.0
    with pytest.raises(ValueError, match="null"):
        given(None)


def test_default_objects_are_all_default() -> None:
    """A default object has only default members: leaving an empty object out of the hash rests on it."""
    for kind in (RateRequest, Bank):
        for field in msgspec.structs.fields(kind):
            if isinstance(field.default, msgspec.Struct):
                assert _object(field.default) == {}


def test_examples_are_valid_requests() -> None:
    """Every example body that comes with the package reads."""
    bodies = [f for f in (resources.files("crossbank") / "examples").iterdir() if f.name.endswith(".json")]
    assert len(bodies) >= 3
    for file in bodies:
        assert msgspec.json.decode(file.read_bytes(), type=RateRequest).label
