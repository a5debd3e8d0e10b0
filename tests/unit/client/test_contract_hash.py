"""The canonical form: what moves the hash and what does not."""

import copy
import hashlib
import sys
from typing import Any

import msgspec
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from crossbank.contract import Bank, RateRequest, Request, bank_sha256, canonical, input_sha256
from crossbank.contract.names import FLUID_ALIASES, MATERIAL_ALIASES, aliases_of, fluid_slug, material_slug

BODY: dict[str, Any] = {
    "bank": {
        "layout": {
            "arrangement": "inline",
            "transverse_pitch_m": 0.05,
            "longitudinal_pitch_m": 0.045,
            "rows": 2,
            "tubes_per_row": 10,
            "tube_length_m": 2,
        },
        "tube": {"outer_diameter_m": 0.025, "wall_thickness_m": 0.002, "material": "carbon-steel"},
    },
    "outside": {
        "fluid": "air",
        "flow": {"kind": "mass", "kg_s": 4},
        "inlet_temperature_k": 268,
        "inlet_pressure_pa": 101325,
    },
    "inside": {"kind": "condensing", "fluid": "water", "inlet_pressure_pa": 400000},
}


def read(body: Any) -> RateRequest:
    """Decode a body as the service does."""
    return msgspec.json.decode(msgspec.json.encode(body), type=RateRequest)


def test_the_canonical_form_is_the_least_that_means_the_same() -> None:
    """Only what was said and is not a default remains, shorthands written out."""
    assert canonical("rate", read(BODY)) == {
        "call": "rate",
        "contract": "1",
        "request": BODY
        | {
            "outside": BODY["outside"] | {"fluid": {"kind": "pure", "name": "air"}},
            "inside": BODY["inside"] | {"fluid": {"kind": "pure", "name": "water"}},
        },
    }


def test_the_hash_is_that_of_the_written_out_bytes() -> None:
    """The hash can be repeated by hand: sorted members, no blanks, shortest numbers, SHA-256."""
    text = (
        '{"bank":{"layout":{"arrangement":"inline","longitudinal_pitch_m":0.045,"rows":2,"transverse_pitch_m":0.05,'
        '"tube_length_m":2,"tubes_per_row":10},"tube":{"material":"carbon-steel","outer_diameter_m":0.025,'
        '"wall_thickness_m":0.002}}'
    )
    assert bank_sha256(read(BODY).bank) == hashlib.sha256((text + "}").encode()).hexdigest()
    rest = (
        ',"inside":{"fluid":{"kind":"pure","name":"water"},"inlet_pressure_pa":400000,"kind":"condensing"},'
        '"outside":{"flow":{"kg_s":4,"kind":"mass"},"fluid":{"kind":"pure","name":"air"},'
        '"inlet_pressure_pa":101325,"inlet_temperature_k":268}}'
    )
    whole = '{"call":"rate","contract":"1","request":' + text + rest + "}"
    assert input_sha256("rate", read(BODY)) == hashlib.sha256(whole.encode()).hexdigest()


DEFAULTS: dict[str, Any] = {
    "/strict": False,
    "/methods": {},
    "/methods/outside_heat_transfer": "auto",
    "/detail": {},
    "/detail/resolution": "row",
    "/detail/property_state": "local",
    "/detail/rows": True,
    "/detail/compare_methods": False,
    "/bank/circuit": {},
    "/bank/circuit/passes": 1,
    "/bank/circuit/direction": "against",
    "/bank/tube_axis": "horizontal",
    "/bank/tube/roughness_m": 4.5e-5,
    "/outside/fouling_m2_k_w": 0.0,
    "/inside/fouling_m2_k_w": 0,
}
NULLS = (
    *DEFAULTS,
    "/label",
    "/reference",
    "/bank/fins",
    "/bank/layout/side_gap_m",
    "/bank/circuit/loss_coefficient",
    "/detail/segments",
    "/outside/elevation_m",
    "/inside/saturation_temperature_k",
    "/inside/inlet_superheat_k",
)
SAME: dict[str, list[Any]] = {
    "/outside/fluid": [
        "air",
        "dry-air",
        {"kind": "pure", "name": "air"},
        {"kind": "pure", "name": "dry-air"},
    ],
    "/inside/fluid": ["water", "steam", "h2o", {"kind": "pure", "name": "steam"}],
    "/bank/tube/material": ["carbon-steel", "steel", "mild-steel"],
    "/outside/flow/kg_s": [4, 4.0],
    "/outside/inlet_temperature_k": [268, 268.0],
    "/bank/layout/tube_length_m": [2, 2.0],
    "/label": ["a", "b"],
    "/reference": [{}, {"equipment": "H-1"}, {"order": "7", "case": "winter"}],
}


def put(body: dict[str, Any], pointer: str, value: Any) -> None:
    """Set a member by JSON Pointer, making the objects above it."""
    *path, last = pointer.strip("/").split("/")
    for name in path:
        if body.get(name) is None:
            body[name] = {}
        body = body[name]
    body[last] = copy.deepcopy(value)


@settings(max_examples=150, deadline=None)
@given(
    defaults=st.sets(st.sampled_from(sorted(DEFAULTS))),
    nulls=st.sets(st.sampled_from(sorted(NULLS))),
    same=st.fixed_dictionaries({}, optional={k: st.sampled_from(v) for k, v in SAME.items()}),
)
def test_writing_out_what_is_meant_anyway_keeps_the_hash(
    defaults: set[str], nulls: set[str], same: dict[str, Any]
) -> None:
    """Defaults, nulls, aliases, shorthands, integral floats and identity, written out or not: one hash."""
    body = copy.deepcopy(BODY)
    for pointer in sorted(nulls - defaults):
        if not any(d.startswith(pointer + "/") for d in defaults | nulls):
            put(body, pointer, None)
    for pointer in sorted(defaults):
        put(body, pointer, DEFAULTS[pointer])
    for pointer, value in same.items():
        put(body, pointer, value)
    assert input_sha256("rate", read(body)) == input_sha256("rate", read(BODY))


CHANGES: dict[str, Any] = {
    "/strict": True,
    "/methods/inside_heat_transfer": "chato-1962",
    "/detail/resolution": "bank",
    "/detail/segments": 10,
    "/detail/rows": False,
    "/bank/circuit/passes": 2,
    "/bank/circuit/direction": "with",
    "/bank/circuit/loss_coefficient": 0.0,
    "/bank/tube/roughness_m": 0.0,
    "/bank/tube/material": {"name": "carbon-steel", "conductivity_w_m_k": 50},
    "/bank/layout/side_gap_m": 0.0,
    "/outside/fluid": {"kind": "moist-air", "humidity_ratio": 0.0},
    "/outside/flow": {"kind": "actual-volume", "m3_s": 4},
    "/outside/inlet_temperature_k": 268.00000000000006,
    "/inside/inlet_superheat_k": 0.0,
}


@pytest.mark.parametrize("pointer", sorted(CHANGES))
def test_whatever_may_move_the_result_moves_the_hash(pointer: str) -> None:
    """A change of meaning, zero where null was the default included, gives another hash."""
    body = copy.deepcopy(BODY)
    put(body, pointer, CHANGES[pointer])
    assert input_sha256("rate", read(body)) != input_sha256("rate", read(BODY))


def test_the_call_is_part_of_the_hash() -> None:
    """The same body to another call has another hash."""
    assert input_sha256("rate", read(BODY)) != input_sha256("check", read(BODY))


def test_the_bank_hash_knows_the_equipment_only() -> None:
    """The day's state leaves the bank's hash alone; the equipment moves it."""
    body = copy.deepcopy(BODY)
    put(body, "/outside/flow/kg_s", 5)
    assert bank_sha256(read(body).bank) == bank_sha256(read(BODY).bank)
    put(body, "/bank/layout/rows", 3)
    assert bank_sha256(read(body).bank) != bank_sha256(read(BODY).bank)


class Extra(Request, kw_only=True, frozen=True):
    """An object a later contract adds."""

    depth: float | None = 1.0


class LaterBank(Bank, kw_only=True, frozen=True):
    """The bank of a later contract: more members, each with a default that means "as before"."""

    wall_fill: str | None = "half-tubes"
    slope: float | None = 0.0
    extra: Extra | None = Extra()
    supports: Extra | None = None
    cavities: list[float] | None = msgspec.field(default_factory=list)
    condition: Extra | None = None


def test_members_added_with_a_default_leave_old_hashes_alone() -> None:
    """A later contract that adds members with defaults gives old requests their old hashes."""
    bank = msgspec.convert(BODY["bank"], Bank)
    later = msgspec.convert(BODY["bank"], LaterBank)
    assert bank_sha256(later) == bank_sha256(bank)
    assert bank_sha256(msgspec.convert(BODY["bank"] | {"cavities": []}, LaterBank)) == bank_sha256(bank)
    assert bank_sha256(msgspec.convert(BODY["bank"] | {"extra": {"depth": 1}}, LaterBank)) == bank_sha256(
        bank
    )
    assert bank_sha256(msgspec.convert(BODY["bank"] | {"condition": {"depth": 2}}, LaterBank)) == bank_sha256(
        bank
    )


def test_an_empty_object_stays_where_null_is_the_default() -> None:
    """Given and empty differs from not given when the default is null; list elements always stay."""
    bank = msgspec.convert(BODY["bank"], Bank)
    assert bank_sha256(msgspec.convert(BODY["bank"] | {"supports": {}}, LaterBank)) != bank_sha256(bank)
    assert bank_sha256(msgspec.convert(BODY["bank"] | {"cavities": [0.0]}, LaterBank)) != bank_sha256(bank)


def test_structs_built_in_python_hash_like_bodies() -> None:
    """A request built from structs, or changed with replace, has the hash of the same body."""
    request = read(BODY)
    assert input_sha256("rate", msgspec.structs.replace(request, methods=None, strict=None)) == input_sha256(
        "rate", request
    )


@pytest.mark.parametrize("bad", [float("nan"), float("inf")])
def test_a_number_that_is_none_has_no_hash(bad: float) -> None:
    """Not-a-number and infinity have no canonical form."""
    request = read(BODY)
    with pytest.raises(ValueError, match=r".*"):
        input_sha256(
            "rate",
            msgspec.structs.replace(
                request, outside=msgspec.structs.replace(request.outside, inlet_pressure_pa=bad)
            ),
        )


def test_without_the_extra_the_hash_says_what_to_install(monkeypatch: pytest.MonkeyPatch) -> None:
    """The thin client without rfc8785 names the extra."""
    monkeypatch.setitem(sys.modules, "rfc8785", None)
    with pytest.raises(ImportError, match=r"crossbank\[hash\]"):
        input_sha256("rate", read(BODY))


@pytest.mark.parametrize("table", [FLUID_ALIASES, MATERIAL_ALIASES])
def test_aliases_lead_to_slugs_in_one_step(table: dict[str, str]) -> None:
    """No alias leads to another alias, and all words are lower-case."""
    assert not set(table) & set(table.values())
    assert all(word == word.lower().strip() for word in (*table, *table.values()))


def test_names_are_exact_words() -> None:
    """Aliases resolve; an unknown or differently written word passes as it is."""
    assert fluid_slug("r717") == "ammonia"
    assert fluid_slug("Water") == "Water"
    assert material_slug("steel") == "carbon-steel"
    assert aliases_of("ammonia", FLUID_ALIASES) == ["nh3", "r717"]
