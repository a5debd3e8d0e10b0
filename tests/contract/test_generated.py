"""Requests generated from the OpenAPI document: what it says is what the service does."""

import copy
import random
from collections import Counter
from typing import Any

import httpx
import msgspec
import schemathesis
from hypothesis import HealthCheck, Phase, given, settings
from hypothesis import strategies as st
from schemathesis.config import SchemathesisConfig
from schemathesis.generation import GenerationMode
from schemathesis.generation.meta import TestPhase

from crossbank.contract import RateRequest
from crossbank_service.http import Settings, create_app
from crossbank_service.http.examples import examples
from crossbank_service.http.faults import whole
from crossbank_service.methods import METHODS, in_role

COVERAGE_SHARE = 0.08

CONFIG = SchemathesisConfig.from_dict(
    {
        "checks": {
            # a body can fit the schema and still describe no possible bank: see the check below
            "positive_data_acceptance": {"expected-statuses": ["200", "422"]},
            "negative_data_rejection": {
                "expected-statuses": ["400", "401", "404", "405", "406", "413", "415", "422"]
            },
        }
    }
)

# its own application: one application cannot run two lifespans
schema: Any = schemathesis.openapi.from_asgi("/openapi.json", create_app(Settings()), config=CONFIG)


@schemathesis.serializer("application/msgpack", "application/vnd.msgpack")
def pack(context: Any, value: Any) -> bytes:
    """Write a generated body as MessagePack."""
    del context
    if isinstance(value, bytes):
        return value
    try:
        return msgspec.msgpack.encode(value)
    except OverflowError:
        # an integer beyond 64 bits: 0xc1 is never valid MessagePack
        return b"\xc1"


@schemathesis.deserializer("application/msgpack", "application/vnd.msgpack")
def unpack(context: Any, response: Any) -> Any:
    """Read an answer in MessagePack."""
    del context
    return msgspec.msgpack.decode(response.content)


def only_physics_refuses(case: Any, response: Any) -> None:
    """Let a body that fits the schema be refused only for what no schema can state."""
    if response.status_code != 422 or case.meta.generation.mode is not GenerationMode.POSITIVE:
        return
    if case.operation.path != "/v1/rate":
        return
    request = msgspec.convert(whole(case.body), RateRequest)
    problem = response.json()
    assert problem["code"] in {"impossible", "invalid-input", "not-converged"}, problem
    if problem["code"] == "not-converged":
        assert "residual" in problem["detail"] or "moved" in problem["detail"]
    else:
        assert problem["errors"], (problem, request)


@schema.parametrize()  # type: ignore[untyped-decorator]
@settings(
    max_examples=30,
    deadline=None,
    database=None,
    suppress_health_check=list(HealthCheck),
    # without shrinking: generated bodies are small enough to read, and shrinking them takes minutes
    phases=(Phase.explicit, Phase.reuse, Phase.generate),
)
def test_the_service_does_what_the_document_says(case: Any) -> None:
    """Statuses, media types, headers, schemas of answers; no generated request makes it fail."""
    # thousands of near alike bodies, three media: each run looks at another part of them
    many = case.operation.path == "/v1/rate" and case.meta.phase.name is TestPhase.COVERAGE
    if many and random.random() > COVERAGE_SHARE:  # noqa: S311  a choice of tests
        return
    response = case.call()
    case.validate_response(response)
    only_physics_refuses(case, response)


def _factor(draw: st.DrawFn, value: float) -> float:
    return value * draw(st.floats(0.7, 1.4))


@st.composite
def sensible_bodies(draw: st.DrawFn) -> Any:
    """Draw bodies as people write them: an example, its numbers moved, its words exchanged."""
    body = copy.deepcopy(examples()[draw(st.sampled_from(sorted(examples())))])
    layout, tube = body["bank"]["layout"], body["bank"]["tube"]
    layout["arrangement"] = draw(st.sampled_from(["inline", "staggered"]))
    layout["rows"] = draw(st.integers(1, 30))
    divisors = [n for n in range(1, layout["rows"] + 1) if layout["rows"] % n == 0]
    layout["tubes_per_row"] = draw(st.integers(2, 60))
    layout["tube_length_m"] = _factor(draw, layout["tube_length_m"])
    layout["transverse_pitch_m"] = tube["outer_diameter_m"] * draw(st.floats(1.3, 4.0))
    layout["longitudinal_pitch_m"] = tube["outer_diameter_m"] * draw(st.floats(1.2, 3.0))
    tube["material"] = draw(st.sampled_from(["carbon-steel", "stainless-304", "copper", "aluminium"]))
    outside = body["outside"]
    outside["flow"] = {"kind": "approach-velocity", "m_s": draw(st.floats(0.2, 8.0))}
    outside["inlet_temperature_k"] = draw(st.floats(280.0, 400.0))
    outside["fouling_m2_k_w"] = draw(st.floats(0.0, 1e-3))
    outside["fluid"] = draw(
        st.sampled_from(
            [
                "air",
                "nitrogen",
                {"kind": "moist-air", "humidity_ratio": 0.005},
                {"kind": "moist-air", "relative_humidity": 0.2},
                {"kind": "gas-mixture", "mole_fractions": {"nitrogen": 0.8, "carbon_dioxide": 0.2}},
                {"kind": "combustion-gas", "carbon": 1.0, "dry_oxygen_mole_fraction": 0.06},
            ]
        )
    )
    if body["inside"]["kind"] == "single-phase":
        body["bank"]["circuit"] = {"passes": draw(st.sampled_from(divisors))}
    if draw(st.booleans()):
        body["inside"] = {"kind": "held-surface", "temperature_k": draw(st.floats(260.0, 500.0))}
    arrangement = layout["arrangement"]
    methods = in_role("outside_heat_transfer")
    fitting = [m.slug for m in methods if "plain" in m.surfaces and arrangement in m.arrangements]
    body["methods"] = {"outside_heat_transfer": draw(st.sampled_from(["auto", *fitting]))}
    body["detail"] = {"resolution": draw(st.sampled_from(["row", "bank"]))}
    return body


def test_sensible_bodies_are_answered(service: httpx.Client) -> None:
    """Of bodies as people write them at least half are rated, and the others are called impossible."""
    counts: Counter[str] = Counter()

    @settings(max_examples=60, deadline=None, database=None, suppress_health_check=list(HealthCheck))
    @given(sensible_bodies())
    def rate(body: Any) -> None:
        answer = service.post("/v1/rate", json=body)
        counts["200" if answer.status_code == 200 else answer.json()["code"]] += 1

    rate()
    assert set(counts) <= {"200", "impossible"}, counts
    assert counts["200"] >= sum(counts.values()) / 2, counts


def test_the_document_knows_every_method() -> None:
    """The slugs in the path are those of the registry."""
    (parameter,) = schema.raw_schema["paths"]["/v1/methods/{slug}"]["get"]["parameters"]
    assert parameter["schema"]["enum"] == list(METHODS)
