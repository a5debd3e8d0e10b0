"""For whoever runs or reads the service: health, the description, the page."""

from typing import Any

import msgspec
from litestar import Request, Response, get, route

from crossbank_service.http.calls import answer_response
from crossbank_service.http.document import document_bytes
from crossbank_service.http.media import JSON, negotiate
from crossbank_service.http.outer import request_id
from crossbank_service.http.page import page_bytes
from crossbank_service.http.problems import Refusal, problem_of, problem_response

# nothing on the page comes from another address, and nothing on it runs
_PAGE_POLICY = (
    "default-src 'none'; style-src 'unsafe-inline'; img-src data:; base-uri 'none'; form-action 'none'"
)


@route(
    "/health/live",
    http_method=["GET", "HEAD"],
    operation_id="live",
    opt={"public": True, "tag": "Health", "word": "alive"},
)
async def live(request: Request[Any, Any, Any]) -> Response[bytes]:
    """Say that the process answers.

    For a supervisor that restarts what does not.
    """
    return _healthy(request, "alive")


@route(
    "/health/ready",
    http_method=["GET", "HEAD"],
    operation_id="ready",
    opt={"public": True, "tag": "Health", "word": "ready", "errors": ("503",)},
)
async def ready(request: Request[Any, Any, Any]) -> Response[bytes]:
    """Say whether calculations are answered.

    Not before the property library is loaded and one rating has been run.
    """
    warm_up = request.app.state.warm_up
    if warm_up.done:
        return _healthy(request, "ready")
    scope: Any = request.scope
    detail = "The rating run at the start failed; the log says why." if warm_up.failed else "Still starting."
    problem = problem_of(Refusal("overloaded", detail), request_id(scope))
    return problem_response(problem, {"retry-after": "1"}, with_body=request.method != "HEAD")


@get("/openapi.json", operation_id="description", opt={"public": True, "tag": "Description", "json": True})
async def description(request: Request[Any, Any, Any]) -> Response[bytes]:
    """Give this description as an OpenAPI document.

    Version 3.1, with units and bounds of every number and the words this service accepts.
    """
    negotiate(request.headers.get("accept", ""), (JSON,))
    return answer_response(document_bytes(request.app), JSON)


@get("/docs", operation_id="page", opt={"public": True, "tag": "Description", "html": True})
async def page(request: Request[Any, Any, Any]) -> Response[bytes]:
    """Give this description as a page for people.

    It needs no script and no other address.
    """
    negotiate(request.headers.get("accept", ""), ("text/html",))
    return answer_response(
        page_bytes(request.app), "text/html; charset=utf-8", {"content-security-policy": _PAGE_POLICY}
    )


ROUTES = (live, ready, description, page)


def _healthy(request: Request[Any, Any, Any], word: str) -> Response[bytes]:
    content = b"" if request.method == "HEAD" else msgspec.json.encode({"status": word})
    return answer_response(content, JSON, {"cache-control": "no-store"})
