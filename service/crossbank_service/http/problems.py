"""The one table from refusals to problem documents (RFC 9457).

Codes, statuses and titles stand in the contract; the core's errors carry a code and know no HTTP. The text of
an unexpected error never leaves the house: it goes to the log with the request's id.
"""

from typing import Any

import msgspec
from litestar import MediaType, Request, Response
from litestar.exceptions import HTTPException

from crossbank.contract import FieldProblem, Problem
from crossbank.contract.problem import CODES
from crossbank_service.errors import CoreError, Fault
from crossbank_service.http.outer import request_id

PROBLEM_MEDIA = "application/problem+json"

# statuses the framework raises by itself
_CODE_OF_STATUS = {
    400: "malformed",
    401: "unauthorized",
    404: "not-found",
    405: "method-not-allowed",
    413: "too-large",
    429: "too-many",
}


class Refusal(HTTPException):
    """A refusal of the HTTP edge itself, by its code."""

    def __init__(
        self,
        code: str,
        detail: str,
        faults: list[Fault] | None = None,
        headers: dict[str, str] | None = None,
    ) -> None:
        super().__init__(detail=detail, status_code=CODES[code][0], headers=headers)
        self.code = code
        self.faults = faults or []


def problem_of(error: BaseException, identity: str | None) -> Problem:
    """Write an error as a problem document.

    Parameters
    ----------
    error : BaseException
        What was raised: by the core, by this edge, by the framework, or unexpected.
    identity : str or None
        The request's id.
    """
    if isinstance(error, CoreError | Refusal):
        return _problem(error.code, str(error.detail), error.faults, identity)
    if isinstance(error, HTTPException):
        code = _CODE_OF_STATUS.get(error.status_code)
        if code is not None:
            return _problem(code, _FRAMEWORK_TEXTS.get(code), [], identity)
    return _problem("internal", "The error is in the service's log under this request's id.", [], identity)


def on_error(request: Request[Any, Any, Any], error: Exception) -> Response[bytes]:
    """Answer a request whose handler raised."""
    scope: Any = request.scope
    problem = problem_of(error, request_id(scope))
    if problem.code == "method-not-allowed":
        problem = msgspec.structs.replace(
            problem, detail=f"{request.method} is not answered here; the header Allow lists what is."
        )
    if problem.status == 500:
        request.app.state.log.failure("failure", error, request_id=problem.request_id)
    headers = dict(getattr(error, "headers", None) or {})
    return problem_response(problem, headers, with_body=request.method != "HEAD")


def problem_response(
    problem: Problem, headers: dict[str, str] | None = None, *, with_body: bool = True
) -> Response[bytes]:
    """Put a problem document on the wire."""
    body = msgspec.json.encode(problem) if with_body else b""
    # the framework would add a charset, which JSON does not have
    response = Response(body, status_code=problem.status, media_type=MediaType.TEXT, headers=headers)
    response.headers["content-type"] = PROBLEM_MEDIA
    return response


_FRAMEWORK_TEXTS = {
    "not-found": "There is nothing at this path; /docs describes what there is.",
    "too-large": "The body is larger than this service accepts; GET /v1 tells the limit.",
}


def _problem(code: str, detail: str | None, faults: list[Fault], identity: str | None) -> Problem:
    status, title = CODES[code]
    return Problem(
        type=f"/docs#problem-{code}",
        title=title,
        status=status,
        code=code,
        detail=detail,
        errors=[
            FieldProblem(
                pointer=fault.pointer,
                detail=fault.detail,
                given=fault.given,
                unit=fault.unit,
                at_least=fault.at_least,
                at_most=fault.at_most,
                one_of=list(fault.one_of) if fault.one_of is not None else None,
            )
            for fault in faults
        ],
        request_id=identity or None,
    )
