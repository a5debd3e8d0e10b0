"""The OpenAPI document: paths from the routes, every schema from the contract's types.

The framework's own generator loses units, bounds inside lists and the closedness of requests, so schemas are
msgspec's. What a route takes and gives, and its parameters, stand in the route's ``opt``.
"""

from collections.abc import Iterator
from functools import cache
from typing import Any

import msgspec
from litestar import Litestar
from litestar.handlers import HTTPRouteHandler
from litestar.routes import HTTPRoute

from crossbank.contract import CONTRACT, Problem, RateRequest
from crossbank.contract.problem import CODES
from crossbank_service import identity
from crossbank_service.http.examples import examples
from crossbank_service.http.keys import KEY_HEADER
from crossbank_service.http.media import JSON, MSGPACK, MSGPACK_VENDOR
from crossbank_service.http.problems import PROBLEM_MEDIA
from crossbank_service.http.vocabulary import add_words

_SCHEMA_TEMPLATE = "#/components/schemas/{name}"

_ABOUT = (
    "Rates crossflow tube banks: duty, outlet states and pressure drops, with the method behind every "
    "number. Bodies are JSON or MessagePack; numbers are SI, with the unit at the end of the name and under "
    "`x-unit`. Requests are closed: a member this document does not name is refused. Answers are open: later "
    "versions may add members and words.\n\n"
    "Results are estimates by published correlations. Where pressure, hot surfaces, freezing or corrosion "
    "can hurt someone, local codes and licensed practice decide."
)

_TAGS = {
    "Calculations": "Banks in, performance out.",
    "Methods": "The published correlations behind the numbers.",
    "Catalogues": "What can be asked for and said.",
    "Service": "What this service is.",
    "Health": "For whoever runs the service; never behind a key.",
    "Description": "This description, for programs and for people.",
}

_ALWAYS = ("500",)
_OF_ANSWER = ("406",)
_OF_BODY = ("400", "413", "415", "422")


def document_bytes(app: Litestar) -> bytes:
    """Give the document of an application as JSON, two spaces deep, ending in a newline."""
    return _encoded(app, keyed=bool(app.state.settings.api_key_sha256))


def document_of(app: Litestar) -> dict[str, Any]:
    """Give the document of an application as builtins."""
    document: dict[str, Any] = msgspec.json.decode(document_bytes(app))
    return document


# the routes are the same in every application of a process: only keys make a difference
_cache: dict[bool, bytes] = {}


def _encoded(app: Litestar, *, keyed: bool) -> bytes:
    if keyed not in _cache:
        document = _build(app, keyed=keyed)
        _cache[keyed] = msgspec.json.format(msgspec.json.encode(document), indent=2) + b"\n"
    return _cache[keyed]


def _build(app: Litestar, *, keyed: bool) -> dict[str, Any]:
    schemas, references = _schemas(app)
    paths: dict[str, Any] = {}
    for path, method, handler in _operations(app):
        paths.setdefault(path, {})[method.lower()] = _operation(handler, method, references, keyed=keyed)
    components: dict[str, Any] = {
        "schemas": schemas,
        "responses": _problem_responses(references[Problem]),
        "headers": _HEADERS,
    }
    if keyed:
        components["securitySchemes"] = {"key": {"type": "apiKey", "in": "header", "name": KEY_HEADER}}
    return {
        "openapi": "3.1.0",
        "info": {
            "title": "crossbank",
            "version": identity.SERVICE_VERSION,
            "summary": f"Rating of crossflow tube banks, contract {CONTRACT}",
            "description": _ABOUT,
            "license": {"name": "Apache-2.0", "identifier": "Apache-2.0"},
        },
        "servers": [{"url": "/", "description": "The service this document came from"}],
        "tags": [{"name": name, "description": text} for name, text in _TAGS.items()],
        "paths": paths,
        "components": components,
    }


def _operations(app: Litestar) -> Iterator[tuple[str, str, HTTPRouteHandler]]:
    found = [
        (route.path_format, method, handler)
        for route in app.routes
        if isinstance(route, HTTPRoute)
        for handler in route.route_handlers
        for method in handler.http_methods
        if handler.operation_id
    ]
    tags = list(_TAGS)
    yield from sorted(found, key=lambda o: (tags.index(o[2].opt["tag"]), o[0], o[1]))


def _schemas(app: Litestar) -> tuple[dict[str, Any], dict[Any, Any]]:
    handlers = [handler for *_, handler in _operations(app)]
    types = [
        Problem,
        *(handler.opt[k] for handler in handlers for k in ("takes", "gives") if k in handler.opt),
    ]
    types = list(dict.fromkeys(types))
    references, schemas = msgspec.json.schema_components(types, ref_template=_SCHEMA_TEMPLATE)
    add_words(schemas, RateRequest)
    return dict(sorted(schemas.items())), dict(zip(types, references, strict=True))


def _operation(
    handler: HTTPRouteHandler, method: str, references: dict[Any, Any], *, keyed: bool
) -> dict[str, Any]:
    opt = handler.opt
    summary, description = _texts(handler)
    identity = str(handler.operation_id)
    operation: dict[str, Any] = {
        "operationId": identity if method != "HEAD" else f"{identity}-head",
        "tags": [opt["tag"]],
        "summary": summary,
        "description": description,
    }
    if keyed and not opt.get("public"):
        operation["security"] = [{"key": []}]
    parameters = [_parameter(p, "path") for p in opt.get("path", ())]
    parameters += [_parameter(p, "query") for p in opt.get("query", ())]
    if parameters:
        operation["parameters"] = parameters
    if "takes" in opt:
        operation["requestBody"] = {"required": True, "content": _request_content(opt, references)}
    operation["responses"] = {"200": _success(opt, method, references)}
    statuses = [*_ALWAYS, *opt.get("errors", ())]
    if "gives" in opt or "json" in opt or "html" in opt:
        statuses += _OF_ANSWER
    if "takes" in opt:
        statuses += _OF_BODY
    if keyed and not opt.get("public"):
        statuses.append("401")
    for status in sorted(statuses):
        reference = {"$ref": f"#/components/responses/Problem{status}"}
        operation["responses"][status] = reference if method != "HEAD" else {"description": _meaning(status)}
    return operation


def _request_content(opt: dict[str, Any], references: dict[Any, Any]) -> dict[str, Any]:
    content: dict[str, Any] = {
        media: {"schema": references[opt["takes"]]} for media in (JSON, MSGPACK, MSGPACK_VENDOR)
    }
    if opt.get("examples"):
        content[JSON]["examples"] = {
            name: {"summary": str(body.get("label", name)), "value": body}
            for name, body in examples().items()
        }
    return content


def _success(opt: dict[str, Any], method: str, references: dict[Any, Any]) -> dict[str, Any]:
    headers = {"X-Request-Id": {"$ref": "#/components/headers/X-Request-Id"}}
    answer: dict[str, Any] = {"description": "The answer.", "headers": headers}
    if "takes" in opt:
        headers["Server-Timing"] = {"$ref": "#/components/headers/Server-Timing"}
    if method == "HEAD":
        answer["description"] = "As GET, without the body."
    elif "gives" in opt:
        answer["content"] = {media: {"schema": references[opt["gives"]]} for media in (JSON, MSGPACK)}
    elif "json" in opt:
        answer["content"] = {JSON: {"schema": {"type": "object"}}}
    elif "html" in opt:
        answer["content"] = {"text/html": {"schema": {"type": "string"}}}
    else:
        status = {"type": "object", "properties": {"status": {"const": opt["word"]}}, "required": ["status"]}
        answer["content"] = {JSON: {"schema": status}}
    return answer


_HEADERS = {
    "X-Request-Id": {
        "description": "The request's id: the one sent in this header, or a new one. It stands in the log.",
        "schema": {"type": "string"},
    },
    "Server-Timing": {
        "description": "Milliseconds spent reading, calculating and writing.",
        "schema": {"type": "string"},
    },
}


def _problem_responses(reference: Any) -> dict[str, Any]:
    return {
        f"Problem{status}": {
            "description": _meaning(str(status)),
            "headers": {"X-Request-Id": {"$ref": "#/components/headers/X-Request-Id"}},
            "content": {PROBLEM_MEDIA: {"schema": reference}},
        }
        for status in sorted({status for status, _ in CODES.values()})
    }


def _meaning(status: str) -> str:
    words = [f"`{code}`: {title.lower()}" for code, (at, title) in CODES.items() if str(at) == status]
    return "; ".join(words).capitalize() + "."


def _parameter(parameter: dict[str, Any], where: str) -> dict[str, Any]:
    return {
        "name": parameter["name"],
        "in": where,
        "required": where == "path",
        "description": parameter["description"],
        "schema": {"type": "string", "enum": list(parameter["words"])},
    }


@cache
def _split(docstring: str) -> tuple[str, str]:
    first, _, rest = docstring.strip().partition("\n")
    paragraphs = [" ".join(p.split()) for p in rest.strip().split("\n\n")]
    return first.strip().rstrip("."), "\n\n".join(paragraphs)


def _texts(handler: HTTPRouteHandler) -> tuple[str, str]:
    return _split(str(handler.fn.__doc__))
