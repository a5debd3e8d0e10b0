"""The correlations one at a time over HTTP."""

from typing import Any

import httpx
import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from crossbank_service.methods import METHODS
from crossbank_service.methods.nomenclature import NOMENCLATURE

EVERY = [method for records in METHODS.values() for method in records]


def described(service: httpx.Client, slug: str, role: str) -> dict[str, Any]:
    """Give the service's own description of a method."""
    records = service.get(f"/v1/methods/{slug}").json()["methods"]
    (record,) = [each for each in records if each["role"] == role]
    found: dict[str, Any] = record
    return found


def values(entry: dict[str, Any]) -> st.SearchStrategy[Any]:
    """Draw a value of an input as the service describes it."""
    if entry["one_of"]:
        return st.sampled_from(entry["one_of"])
    if entry["meaning"].startswith("true "):
        return st.booleans()
    return st.floats(entry["at_least"], entry["at_most"])


@pytest.mark.parametrize("method", EVERY, ids=lambda m: f"{m.role}:{m.slug}")
def test_every_method_answers_all_it_says_it_accepts(service: httpx.Client, method: Any) -> None:
    """Any inputs within the described bounds, numbers or lists, give 200 and finite numbers."""
    record = described(service, method.slug, method.role)

    @settings(max_examples=8, deadline=None, database=None, suppress_health_check=[HealthCheck.too_slow])
    @given(st.data(), st.integers(0, 3))
    def check(data: st.DataObject, points: int) -> None:
        chosen = [e for e in record["inputs"] if e["required"] or data.draw(st.booleans())]
        body = {
            entry["name"]: data.draw(
                st.lists(values(entry), min_size=points, max_size=points) if points else values(entry)
            )
            for entry in chosen
        }
        answer = service.post(f"/v1/methods/{method.slug}", params={"role": method.role}, json=body)
        assert answer.status_code == 200, answer.text
        found = answer.json()
        assert (found["method"], found["gives"]) == (method.slug, method.gives)
        assert found["unit"] == NOMENCLATURE[method.gives].unit
        if points:
            assert len(found["values"]) == len(found["in_range"]) == len(found["range_note"]) == points
        else:
            assert isinstance(found["values"], float)
            assert (found["range_note"] is None) == found["in_range"]

    check()


ZUKAUSKAS = {
    "reynolds": 20_000,
    "prandtl": 0.7,
    "transverse_pitch_ratio": 2,
    "longitudinal_pitch_ratio": 2,
    "arrangement": "inline",
    "rows": 20,
}


def test_a_published_coefficient_comes_out(service: httpx.Client) -> None:
    """In-line, 1e3 < Re < 2e5: Nu = 0.27 Re^0.63 Pr^0.36 (Zukauskas 1987), evaluated by hand."""
    answer = service.post("/v1/methods/zukauskas-1987", json=ZUKAUSKAS).json()
    assert answer["values"] == pytest.approx(0.27 * 20_000**0.63 * 0.7**0.36, rel=1e-3)
    assert answer["in_range"] is True


def test_lists_agree_with_numbers(service: httpx.Client) -> None:
    """A number beside lists stands for every point; a point does not feel its neighbours."""
    reynolds = [150.0, 20_000.0, 900_000.0]
    listed = service.post("/v1/methods/zukauskas-1987", json={**ZUKAUSKAS, "reynolds": reynolds}).json()
    alone = [
        service.post("/v1/methods/zukauskas-1987", json={**ZUKAUSKAS, "reynolds": one}).json()["values"]
        for one in reynolds
    ]
    assert listed["values"] == alone


def test_out_of_range_is_said_with_its_limits(service: httpx.Client) -> None:
    """The method still answers; the note names quantity, value and limit."""
    answer = service.post("/v1/methods/zukauskas-1987", json={**ZUKAUSKAS, "reynolds": 5e7}).json()
    assert answer["in_range"] is False
    assert "5e+07" in answer["range_note"]
    assert answer["values"] > 0


def errors_of(answer: httpx.Response) -> dict[str, dict[str, Any]]:
    """Give the errors of a refusal by pointer."""
    assert answer.status_code == 422
    return {error["pointer"]: error for error in answer.json()["errors"]}


def test_an_input_the_method_does_not_have_is_refused(service: httpx.Client) -> None:
    """The accepted inputs are listed, even where the name is one of another method."""
    errors = errors_of(service.post("/v1/methods/zukauskas-1987", json={**ZUKAUSKAS, "quality": 0.5}))
    assert set(errors) == {"/quality"}
    assert "reynolds" in errors["/quality"]["one_of"]


def test_missing_inputs_are_named(service: httpx.Client) -> None:
    """Every one of them."""
    errors = errors_of(service.post("/v1/methods/zukauskas-1987", json={"reynolds": 1e4}))
    assert set(errors) == {f"/{name}" for name in ZUKAUSKAS if name != "reynolds"}


def test_bounds_hold_for_each_point(service: httpx.Client) -> None:
    """The pointer ends in the index of the point."""
    errors = errors_of(service.post("/v1/methods/zukauskas-1987", json={**ZUKAUSKAS, "prandtl": [0.7, -1.0]}))
    assert set(errors) == {"/prandtl/1"}
    assert errors["/prandtl/1"]["at_least"] == NOMENCLATURE["prandtl"].at_least


def test_lists_of_unequal_length_are_refused(service: httpx.Client) -> None:
    """With the two lengths."""
    body = {**ZUKAUSKAS, "reynolds": [1e4, 2e4], "prandtl": [0.7, 0.7, 0.7]}
    errors = errors_of(service.post("/v1/methods/zukauskas-1987", json=body))
    assert set(errors) == {"/prandtl"}
    assert "3 elements" in errors["/prandtl"]["detail"]


def test_a_role_the_slug_does_not_serve_is_refused(service: httpx.Client) -> None:
    """With the roles there are."""
    answer = service.post(
        "/v1/methods/zukauskas-1987", params={"role": "inside_pressure_drop"}, json=ZUKAUSKAS
    )
    assert answer.status_code == 422
    assert "outside_heat_transfer" in answer.json()["detail"]


def test_the_listing_holds_every_record(service: httpx.Client) -> None:
    """Inputs with units and bounds, source and scatter come from the record itself."""
    listed = service.get("/v1/methods").json()["methods"]
    assert [(each["slug"], each["role"]) for each in listed] == [(m.slug, m.role) for m in EVERY]
    for record, method in zip(listed, EVERY, strict=True):
        assert record["source"] == method.source
        assert [i["name"] for i in record["inputs"]] == [*method.inputs, *method.options]
