"""The page for people: the OpenAPI document as plain HTML, without a script and without another address."""

import re
from collections.abc import Iterator
from functools import cache
from typing import Any

import jinja2
import markupsafe
import msgspec
from litestar import Litestar

from crossbank.contract.problem import CODES
from crossbank_service.http.document import document_bytes

_FEW_WORDS = 8


def page_bytes(app: Litestar) -> bytes:
    """Render the page of an application."""
    return _page(document_bytes(app))


@cache
def _page(document: bytes) -> bytes:
    content = msgspec.json.decode(document)
    environment = jinja2.Environment(
        loader=jinja2.PackageLoader("crossbank_service.http"),
        autoescape=True,
        undefined=jinja2.StrictUndefined,
        trim_blocks=True,
        lstrip_blocks=True,
    )
    environment.filters.update(kind=_kind, limits=_limits, prose=_prose, pretty=_pretty, slug=_slug)
    template = environment.get_template("docs.html.j2")
    return template.render(document=content, operations=list(_operations(content)), codes=CODES).encode()


def _operations(document: dict[str, Any]) -> Iterator[tuple[str, str, dict[str, Any]]]:
    for path, methods in document["paths"].items():
        for method, operation in methods.items():
            yield path, method.upper(), operation


def _prose(text: str) -> markupsafe.Markup:
    """Write text with `code` marks and blank lines as HTML."""
    escaped = str(markupsafe.escape(text))
    coded = re.sub(r"`([^`]+)`", r"<code>\1</code>", escaped)
    return markupsafe.Markup("".join(f"<p>{part}</p>" for part in coded.split("\n\n") if part))  # noqa: S704  escaped above


def _pretty(value: Any) -> str:
    return msgspec.json.format(msgspec.json.encode(value), indent=2).decode()


def _slug(name: str) -> str:
    return re.sub(r"[^a-z0-9]+", "-", name.lower()).strip("-")


def _kind(schema: dict[str, Any]) -> markupsafe.Markup:
    """Say what a member is, with links to the schemas."""
    escape = markupsafe.escape
    if "$ref" in schema:
        name = schema["$ref"].rpartition("/")[2]
        return markupsafe.Markup('<a href="#schema-{}">{}</a>').format(_slug(name), name)
    if "anyOf" in schema:
        return markupsafe.Markup(" or ").join(dict.fromkeys(_kind(branch) for branch in schema["anyOf"]))
    if "enum" in schema:
        words = markupsafe.Markup(" | ").join(
            markupsafe.Markup("<code>{}</code>").format("null" if word is None else word)
            for word in schema["enum"]
        )
        if len(schema["enum"]) <= _FEW_WORDS:
            return words
        details = markupsafe.Markup("<details><summary>one of {} words</summary>{}</details>")
        return details.format(len(schema["enum"]), words)
    if "const" in schema:
        return markupsafe.Markup("<code>{}</code>").format(schema["const"])
    kind = schema.get("type", "anything")
    if kind == "array":
        return markupsafe.Markup("list of {}").format(_kind(schema.get("items", {})))
    return escape({"integer": "whole number", "string": "text", "boolean": "true or false"}.get(kind, kind))


def _limits(schema: dict[str, Any]) -> str:
    """Say the bounds and the unit of a member."""
    parts = []
    for branch in _branches(schema):
        low, high = branch.get("minimum"), branch.get("maximum")
        unit = branch.get("x-unit", "")
        text = f"{low:g} to {high:g}" if low is not None and high is not None else ""
        if unit and unit != "1":
            text = f"{text} {unit}".strip()
        if text:
            parts.append(text)
    return "; ".join(dict.fromkeys(parts))


def _branches(schema: dict[str, Any]) -> Iterator[dict[str, Any]]:
    yield schema
    for branch in schema.get("anyOf", ()):
        yield from _branches(branch)
    if "items" in schema and isinstance(schema["items"], dict):
        yield from _branches(schema["items"])
