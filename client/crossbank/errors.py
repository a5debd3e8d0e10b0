"""What can go wrong, drawn once.

::

    CrossbankError
    ├── NotSent              the request holds something the wire cannot carry (NaN, infinity, odd objects)
    ├── ConnectionFailed     no connection, or it broke
    ├── TimedOut             no answer within the timeout
    ├── UnreadableAnswer     an answer that is none of this contract's
    └── ApiError             the service answered with a problem     code                 status
        ├── Malformed                                                malformed            400
        ├── Unauthorized                                             unauthorized         401
        ├── NotFound                                                 not-found            404
        ├── MethodNotAllowed                                         method-not-allowed   405
        ├── NotAcceptable                                            not-acceptable       406
        ├── TooLarge                                                 too-large            413
        ├── UnsupportedMedia                                         unsupported-media    415
        ├── InvalidInput                                             invalid-input        422
        ├── Impossible                                               impossible           422
        ├── OutOfRange                                               out-of-range         422
        ├── NotConverged                                             not-converged        422
        ├── TooMany                                                  too-many             429
        ├── ServerError                                              internal             500
        ├── Overloaded                                               overloaded           503
        └── OutOfTime                                                out-of-time          503
"""

from crossbank.contract import FieldProblem, Problem


class CrossbankError(Exception):
    """Base of everything this package raises on purpose."""


class NotSent(CrossbankError, ValueError):
    """The request cannot be written to the wire; nothing was sent."""


class ConnectionFailed(CrossbankError):
    """No connection to the service, or it broke before the answer was complete."""


class TimedOut(CrossbankError):
    """No answer within the timeout."""


class UnreadableAnswer(CrossbankError):
    """Something answered, but not in the words of this contract (a proxy, another service)."""


class ApiError(CrossbankError):
    """The service answered with a problem document.

    Attributes
    ----------
    status : int
        HTTP status.
    code : str
        Stable code of the problem, such as ``invalid-input``.
    detail : str
        One sentence for people.
    errors : list of FieldProblem
        The offending members of the request, each with a JSON Pointer.
    request_id : str or None
        The service's id of the request, to look it up in its log.
    """

    def __init__(
        self,
        *,
        status: int,
        code: str,
        detail: str,
        errors: list[FieldProblem] | None = None,
        request_id: str | None = None,
    ) -> None:
        super().__init__(detail)
        self.status = status
        self.code = code
        self.detail = detail
        self.errors = errors or []
        self.request_id = request_id

    def __str__(self) -> str:
        lines = [f"{self.detail} ({self.code})"]
        lines += [f"  {e.pointer or '/'}: {e.detail}" for e in self.errors]
        if self.request_id:
            lines.append(f"  request {self.request_id}")
        return "\n".join(lines)


class Malformed(ApiError):
    """The body could not be read."""


class Unauthorized(ApiError):
    """The key is missing or unknown."""


class NotFound(ApiError):
    """No such path, method or name."""


class MethodNotAllowed(ApiError):
    """The path does not answer that HTTP method."""


class NotAcceptable(ApiError):
    """The service has no form of the answer that was asked for."""


class TooLarge(ApiError):
    """The body is larger than the service takes."""


class UnsupportedMedia(ApiError):
    """The service does not read that form of body."""


class InvalidInput(ApiError):
    """The request breaks the contract."""


class Impossible(ApiError):
    """Geometry or physics of the request contradict themselves."""


class OutOfRange(ApiError):
    """A method was asked outside its range and the request was strict."""


class NotConverged(ApiError):
    """The solution did not settle; the detail holds the last residual."""


class TooMany(ApiError):
    """Too many requests."""


class ServerError(ApiError):
    """The service failed."""


class Overloaded(ApiError):
    """The service is busy."""


class OutOfTime(ApiError):
    """The calculation took longer than the service allows."""


BY_CODE: dict[str, type[ApiError]] = {
    "malformed": Malformed,
    "unauthorized": Unauthorized,
    "not-found": NotFound,
    "method-not-allowed": MethodNotAllowed,
    "not-acceptable": NotAcceptable,
    "too-large": TooLarge,
    "unsupported-media": UnsupportedMedia,
    "invalid-input": InvalidInput,
    "impossible": Impossible,
    "out-of-range": OutOfRange,
    "not-converged": NotConverged,
    "too-many": TooMany,
    "internal": ServerError,
    "overloaded": Overloaded,
    "out-of-time": OutOfTime,
}

_BY_STATUS: dict[int, type[ApiError]] = {
    400: Malformed,
    401: Unauthorized,
    404: NotFound,
    405: MethodNotAllowed,
    406: NotAcceptable,
    413: TooLarge,
    415: UnsupportedMedia,
    422: InvalidInput,
    429: TooMany,
    503: Overloaded,
}


def error_class(code: str | None, status: int) -> type[ApiError]:
    """Return the class for a code, else for a status: every status of 400 and above has one."""
    known = BY_CODE.get(code) if code is not None else None
    if known is None:
        known = _BY_STATUS.get(status, ServerError if status >= 500 else ApiError)
    return known


def error_from(problem: Problem, request_id: str | None) -> ApiError:
    """Return the error a problem document stands for."""
    return error_class(problem.code, problem.status)(
        status=problem.status,
        code=problem.code,
        detail=problem.detail or problem.title,
        errors=list(problem.errors),
        request_id=problem.request_id or request_id,
    )
