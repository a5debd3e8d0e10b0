"""Carries one calculation from body to answer: in a worker thread, timed, and written down.

Reading, calculating and writing all happen beside the event loop, so that the service goes on answering
health checks while it works.
"""

import asyncio
import contextvars
import time
from collections.abc import Callable
from typing import Any, TypeVar

import msgspec
from litestar import MediaType, Request, Response

from crossbank_service.errors import CoreError
from crossbank_service.http.media import negotiate, read, write
from crossbank_service.http.outer import request_id, trace_id
from crossbank_service.http.problems import problem_of
from crossbank_service.record import calculation_entry

T = TypeVar("T", bound=msgspec.Struct)


async def calculation(
    request: Request[Any, Any, Any],
    call: str,
    body_type: type[T],
    calculate: Callable[[T], msgspec.Struct | CoreError],
) -> Response[bytes]:
    """Answer a request whose body asks for a calculation.

    Parameters
    ----------
    request : Request
        The request.
    call : str
        Last word of the path: the call's name in hash and log.
    body_type : type
        The closed struct the body must fit.
    calculate : callable
        Takes the decoded body, returns the answer or the core's refusal. Runs in a worker thread.
    """
    media = negotiate(request.headers.get("accept", ""))
    body = await request.body()
    work = _Work(request, call, media)
    context = contextvars.copy_context()
    loop = asyncio.get_running_loop()
    return await loop.run_in_executor(
        request.app.state.executor, context.run, work.run, body, body_type, calculate
    )


def answer_response(content: bytes, media: str, headers: dict[str, str] | None = None) -> Response[bytes]:
    """Put an encoded answer on the wire."""
    response = Response(content, media_type=MediaType.TEXT, headers={"vary": "Accept", **(headers or {})})
    response.headers["content-type"] = media
    return response


def _answered(answer: msgspec.Struct | CoreError) -> msgspec.Struct:
    if isinstance(answer, CoreError):
        raise answer
    return answer


class _Work:
    """One calculation with its stopwatch."""

    def __init__(self, request: Request[Any, Any, Any], call: str, media: str) -> None:
        self._request = request
        self._call = call
        self._media = media
        self._start = self._lap = time.perf_counter()
        self._laps: list[str] = []

    def run(
        self, body: bytes, body_type: type[T], calculate: Callable[[T], msgspec.Struct | CoreError]
    ) -> Response[bytes]:
        asked: T | None = None
        try:
            headers = self._request.headers
            asked = read(
                body, headers.get("content-type", ""), headers.get("content-encoding", ""), body_type
            )
            self._time("read")
            answer = _answered(calculate(asked))
            self._time("calculate")
            content = write(answer, self._media)
            self._time("write")
        except Exception as error:
            self._log(asked, None, error)
            raise
        self._log(asked, answer, None)
        return answer_response(content, self._media, {"server-timing": ", ".join(self._laps)})

    def _time(self, name: str) -> None:
        now = time.perf_counter()
        self._laps.append(f"{name};dur={1e3 * (now - self._lap):.3f}")
        self._lap = now

    def _log(self, asked: T | None, answer: msgspec.Struct | None, error: Exception | None) -> None:
        state = self._request.app.state
        if not state.log.on:
            return
        scope: Any = self._request.scope
        problem = None if error is None else problem_of(error, None)
        state.log.write(
            "calculation",
            **calculation_entry(self._call, asked, answer, problem, with_input=state.settings.log_input),
            ms=round(1e3 * (time.perf_counter() - self._start), 3),
            request_id=request_id(scope),
            trace_id=trace_id(scope),
        )
