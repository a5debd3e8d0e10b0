"""The layer around the whole application: request id and one access line for every request.

It stands outside the framework because requests that reach no route (404, 405) pass by the framework's own
middleware. The line never holds a body, a query or a header such as a key.
"""

import re
import time
from collections.abc import Awaitable, Callable, MutableMapping
from typing import Any
from uuid import uuid4

from crossbank_service.record import EventLog

Scope = MutableMapping[str, Any]
Message = MutableMapping[str, Any]
Receive = Callable[[], Awaitable[Message]]
Send = Callable[[Message], Awaitable[None]]
Application = Callable[[Any, Any, Any], Awaitable[None]]

REQUEST_ID_HEADER = "x-request-id"
_SOUND_REQUEST_ID = re.compile(rb"[A-Za-z0-9._-]{1,64}")
_TRACEPARENT = re.compile(rb"[0-9a-f]{2}-([0-9a-f]{32})-[0-9a-f]{16}-[0-9a-f]{2}.*")


def request_id(scope: Scope) -> str:
    """Give the id of the request this scope belongs to."""
    return str(scope.get("state", {}).get("request_id", ""))


def trace_id(scope: Scope) -> str | None:
    """Give the trace id of a W3C ``traceparent`` header, if one was sent."""
    match = _TRACEPARENT.fullmatch(_header(scope, b"traceparent") or b"")
    if match is None or set(match[1]) == {ord("0")}:
        return None
    return match[1].decode()


class OuterLayer:
    """Wraps an ASGI application; what is not its own business is passed on untouched.

    Parameters
    ----------
    application : callable
        The ASGI application inside.
    log : EventLog
        Where the access lines go.
    """

    def __init__(self, application: Any, log: EventLog) -> None:
        self.application = application
        self._log = log

    async def __call__(self, scope: Scope, receive: Receive, send: Send) -> None:
        """Handle one ASGI connection."""
        if scope["type"] != "http":
            await self.application(scope, receive, send)
            return
        sent = _header(scope, REQUEST_ID_HEADER.encode()) or b""
        identity = sent.decode() if _SOUND_REQUEST_ID.fullmatch(sent) else uuid4().hex
        state = scope["state"] = dict(scope.get("state") or {})
        state["request_id"] = identity
        status = 500
        start = time.perf_counter()

        async def send_with_id(message: Message) -> None:
            nonlocal status
            if message["type"] == "http.response.start":
                status = message["status"]
                headers = [*message.get("headers", ()), (REQUEST_ID_HEADER.encode(), identity.encode())]
                message = {**message, "headers": headers}
            await send(message)

        try:
            await self.application(scope, receive, send_with_id)
        finally:
            self._log.write(
                "access",
                method=scope["method"],
                route=scope.get("path_template") or "unmatched",
                status=status,
                ms=round(1e3 * (time.perf_counter() - start), 3),
                request_id=scope["state"]["request_id"],
            )


def _header(scope: Scope, name: bytes) -> bytes | None:
    value: bytes | None = next(
        (value for key, value in scope.get("headers", ()) if key.lower() == name), None
    )
    return value
