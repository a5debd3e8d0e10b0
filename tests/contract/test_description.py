"""The OpenAPI document and the page made from it."""

import re
from collections.abc import Iterator
from html.parser import HTMLParser
from pathlib import Path
from typing import Any

import httpx
import msgspec
import pytest
from openapi_spec_validator import validate

from crossbank.contract import RateRequest
from crossbank_service.__main__ import main
from crossbank_service.http.examples import examples

COMMITTED = Path(__file__).parents[2] / "openapi" / "openapi.json"


@pytest.fixture(scope="module")
def document(service: httpx.Client) -> dict[str, Any]:
    """Give the document as the service gives it."""
    found: dict[str, Any] = service.get("/openapi.json").json()
    return found


def schemas_of(document: dict[str, Any], operation: dict[str, Any]) -> dict[str, dict[str, Any]]:
    """Give the schemas a request is made of, by name."""
    found: dict[str, dict[str, Any]] = {}
    waiting = list(_references(operation["requestBody"]))
    while waiting:
        name = waiting.pop().rpartition("/")[2]
        if name not in found:
            found[name] = document["components"]["schemas"][name]
            waiting += _references(found[name])
    return found


def _references(node: Any) -> Iterator[str]:
    if isinstance(node, dict):
        if "$ref" in node:
            yield node["$ref"]
        for member in node.values():
            yield from _references(member)
    elif isinstance(node, list):
        for member in node:
            yield from _references(member)


def _numbers(node: Any) -> Iterator[dict[str, Any]]:
    if isinstance(node, dict):
        if node.get("type") in {"number", "integer"}:
            yield node
        for member in node.values():
            yield from _numbers(member)
    elif isinstance(node, list):
        for member in node:
            yield from _numbers(member)


def test_the_document_is_valid(document: dict[str, Any]) -> None:
    """By the OpenAPI 3.1 schema."""
    validate(document)


def test_the_committed_document_is_the_generated_one(service: httpx.Client) -> None:
    """It is written by the command and never by hand."""
    assert COMMITTED.read_bytes() == service.get("/openapi.json").content


def test_the_command_notices_a_document_out_of_date(
    tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    """--check compares, without it the file is written."""
    output = tmp_path / "openapi.json"
    assert main(["openapi", "--check", "--output", str(output)]) == 1
    assert "out of date" in capsys.readouterr().err
    assert main(["openapi", "--output", str(output)]) == 0
    assert main(["openapi", "--check", "--output", str(output)]) == 0


def test_every_object_of_a_request_is_closed(document: dict[str, Any]) -> None:
    """AdditionalProperties is false at any depth, so that a reader knows what is refused."""
    for path in document["paths"].values():
        for operation in path.values():
            if "requestBody" in operation:
                for name, schema in schemas_of(document, operation).items():
                    assert schema["additionalProperties"] is False, name


def test_every_number_has_a_unit_and_both_bounds(document: dict[str, Any]) -> None:
    """Where the unit depends on another member, the description says which."""
    for name, schema in document["components"]["schemas"].items():
        if name in {"Problem", "FieldProblem"}:
            continue
        for number in _numbers(schema):
            assert number["minimum"] < number["maximum"], name
            assert number.get("x-unit") or "unit" in number.get("description", ""), name


def test_every_operation_is_described(document: dict[str, Any]) -> None:
    """Summary, description, the codes of its refusals; ids are unique."""
    identities = []
    for path in document["paths"].values():
        for operation in path.values():
            identities.append(operation["operationId"])
            assert operation["summary"]
            assert operation["description"]
            if "requestBody" in operation:
                assert {"400", "406", "413", "415", "422", "500"} <= set(operation["responses"])
    assert len(identities) == len(set(identities))


def test_the_examples_are_those_of_the_client(document: dict[str, Any]) -> None:
    """Each fits the request's type."""
    content = document["paths"]["/v1/rate"]["post"]["requestBody"]["content"]["application/json"]
    shown = {name: example["value"] for name, example in content["examples"].items()}
    assert shown == examples()
    for body in shown.values():
        assert msgspec.convert(body, RateRequest)


class _Reader(HTMLParser):
    """Collects addresses and anchors of a page."""

    def __init__(self) -> None:
        super().__init__()
        self.addresses: list[str] = []
        self.anchors: set[str] = set()
        self.tags: set[str] = set()

    def handle_starttag(self, tag: str, attrs: list[tuple[str, str | None]]) -> None:
        self.tags.add(tag)
        for name, value in attrs:
            if name in {"href", "src", "action", "srcset", "data"}:
                self.addresses.append(value or "")
            if name == "id":
                assert value not in self.anchors, value
                self.anchors.add(value or "")


@pytest.fixture(scope="module")
def page(service: httpx.Client) -> str:
    """Give the page for people."""
    answer = service.get("/docs", headers={"accept": "text/html,application/xhtml+xml,*/*;q=0.8"})
    assert answer.status_code == 200
    assert answer.headers["content-type"].startswith("text/html")
    assert "default-src 'none'" in answer.headers["content-security-policy"]
    return answer.text


def test_the_page_needs_no_other_address(page: str) -> None:
    """No outside address in any attribute, style or text, and no script."""
    reader = _Reader()
    reader.feed(page)
    assert not re.findall(r"https?:|url\(|@import|//[a-z]", page)
    assert reader.tags.isdisjoint({"script", "iframe", "object", "embed", "form"})
    for address in reader.addresses:
        assert address in {"/openapi.json", "data:,"} or address.removeprefix("#") in reader.anchors, address


def test_the_page_shows_units_bounds_and_examples(document: dict[str, Any], page: str) -> None:
    """What a reader needs to write a body without any other source."""
    assert "150 to 2500 K" in page
    for body in examples().values():
        assert msgspec.json.format(msgspec.json.encode(body["label"])).decode()[1:-1] in page
    for schema in document["components"]["schemas"].values():
        for member in schema.get("properties", {}):
            assert f"<code>{member}</code>" in page


def test_problem_types_lead_to_the_page(service: httpx.Client, page: str) -> None:
    """The type of a problem is a place on the page."""
    reader = _Reader()
    reader.feed(page)
    path, _, anchor = service.get("/nothing").json()["type"].partition("#")
    assert path == "/docs"
    assert anchor in reader.anchors
