"""One exchange with the service without any input or output: a generator that says what to do next.

The sync and the async client drive the same generator; it yields :class:`Send` and :class:`Wait` and is sent
what came of them. Every call of the service is a pure calculation, so asking again is always safe.
"""

import math
import random
from collections.abc import Callable, Generator, Mapping
from dataclasses import dataclass
from datetime import UTC, datetime
from email.utils import parsedate_to_datetime
from typing import Any, TypeVar

import msgspec

from crossbank.calls import Answer, Call
from crossbank.contract import Problem
from crossbank.errors import (
    ApiError,
    ConnectionFailed,
    NotSent,
    TimedOut,
    UnreadableAnswer,
    error_class,
    error_from,
)

T = TypeVar("T")

JSON, MSGPACK, PROBLEM = "application/json", "application/vnd.msgpack", "application/problem+json"
MEDIA = {"json": JSON, "msgpack": MSGPACK}
_MSGPACK_SPELLINGS = (MSGPACK, "application/msgpack", "application/x-msgpack")

BUSY = (429, 503)
FIRST_WAIT_S, LONGEST_WAIT_S, LONGEST_RETRY_AFTER_S = 0.25, 8.0, 60.0
MOST_RETRIES = 10


@dataclass(frozen=True)
class Send:
    """Send this and report a :class:`Reply`, :class:`Broken` or :class:`Late`."""

    method: str
    path: str
    headers: Mapping[str, str]
    content: bytes | None


@dataclass(frozen=True)
class Wait:
    """Let this many seconds pass."""

    seconds: float


@dataclass(frozen=True)
class Reply:
    """An HTTP answer; header names in lower case."""

    status: int
    headers: Mapping[str, str]
    content: bytes


@dataclass(frozen=True)
class Broken:
    """The connection failed; ``why`` in the words of the HTTP library."""

    why: str


@dataclass(frozen=True)
class Late:
    """The timeout ran out."""

    why: str


Step = Send | Wait
Outcome = Reply | Broken | Late | None


def exchange(
    call: Call[T], *, media: str, retries: int, jitter: Callable[[], float] = random.random
) -> Generator[Step, Outcome, Answer[T]]:
    """Carry one call through: send, wait and ask again while that helps, read the answer.

    Parameters
    ----------
    call : Call
        What to ask.
    media : str
        ``json`` or ``msgpack``.
    retries : int
        How often a busy service or a broken connection is tried again.
    jitter : callable
        A number from 0 to 1 that spreads the waits of many clients.

    Returns
    -------
    Answer
        The value and the request's id; problems are raised.
    """
    step = _send(call, media)
    for attempt in range(retries + 1):
        outcome = yield step
        last = attempt == retries
        if isinstance(outcome, Late):
            raise TimedOut(f"No answer in time from {call.method} {call.path}: {outcome.why}")
        if isinstance(outcome, Broken):
            if last:
                raise ConnectionFailed(f"{call.method} {call.path}: {outcome.why}")
            yield Wait(backoff_s(attempt, jitter()))
            continue
        if not isinstance(outcome, Reply):
            raise TypeError("The driver of an exchange reports what came of a Send.")
        if outcome.status in BUSY and call.patient and not last:
            asked = retry_after_s(outcome.headers.get("retry-after"))
            if asked is None or asked <= LONGEST_RETRY_AFTER_S:
                yield Wait(max(asked or 0.0, backoff_s(attempt, jitter())))
                continue
        return read(call, outcome)
    raise AssertionError  # the last attempt returns or raises


def backoff_s(attempt: int, jitter: float) -> float:
    """Seconds to wait after a failed attempt (from 0): doubling, capped, spread over its upper half."""
    return min(LONGEST_WAIT_S, FIRST_WAIT_S * 2.0**attempt) * (0.5 + 0.5 * jitter)


def retry_after_s(value: str | None, now: datetime | None = None) -> float | None:
    """Seconds a ``Retry-After`` header asks for (it holds seconds or a date); None where it says nothing."""
    if value is None:
        return None
    try:
        seconds = float(value)
    except ValueError:
        try:
            until = parsedate_to_datetime(value)
        except ValueError:
            return None
        if until.tzinfo is None:
            until = until.replace(tzinfo=UTC)
        seconds = (until - (now or datetime.now(UTC))).total_seconds()
    return max(0.0, seconds) if math.isfinite(seconds) else None


def read(call: Call[T], reply: Reply) -> Answer[T]:
    """Read a reply as the answer of a call; raise the error a problem stands for."""
    request_id = reply.headers.get("x-request-id")
    media = reply.headers.get("content-type", "").partition(";")[0].strip().lower()
    if reply.status >= 400:
        raise _problem(reply, media, request_id)
    if reply.status >= 300:
        raise UnreadableAnswer(
            f"{call.method} {call.path} was redirected ({reply.status}); check the base URL."
        )
    if call.gives is object:
        return Answer(reply.content, request_id, reply.content, media)  # type: ignore[arg-type]
    decode: Callable[..., Any]
    if media == JSON:
        decode = msgspec.json.decode
    elif media in _MSGPACK_SPELLINGS:
        decode = msgspec.msgpack.decode
    else:
        raise UnreadableAnswer(f"{call.method} {call.path} answered in {media or 'no named form'}.")
    try:
        value: T = decode(reply.content, type=call.gives)
    except (msgspec.DecodeError, UnicodeDecodeError) as fault:
        raise UnreadableAnswer(
            f"The answer of {call.method} {call.path} is not as agreed: {fault}"
        ) from fault
    return Answer(value, request_id, reply.content, media)


def _problem(reply: Reply, media: str, request_id: str | None) -> ApiError:
    if media in (PROBLEM, JSON):
        try:
            return error_from(msgspec.json.decode(reply.content, type=Problem), request_id)
        except (msgspec.DecodeError, UnicodeDecodeError):
            pass
    return error_class(None, reply.status)(
        status=reply.status,
        code=f"http-{reply.status}",
        detail=f"The service, or something before it, answered {reply.status} without a problem document.",
        request_id=request_id,
    )


def _send(call: Call[Any], media: str) -> Send:
    headers = {"accept": MEDIA[media]}
    content = None
    if call.body is not None:
        headers["content-type"] = MEDIA[media]
        content = encode(call.body, media)
    return Send(call.method, call.path, headers, content)


def encode(body: Any, media: str) -> bytes:
    """Write a body; refuse what the wire would change silently (JSON turns not-a-number into null)."""
    try:
        plain = msgspec.to_builtins(body, enc_hook=_plain)
        _check_finite(plain, "")
        return msgspec.json.encode(plain) if media == "json" else msgspec.msgpack.encode(plain)
    except (TypeError, OverflowError, RecursionError) as fault:
        raise NotSent(f"The request cannot be written: {fault}") from fault


def _plain(value: Any) -> Any:
    """Turn arrays and array scalars into lists and numbers, mappings into dicts."""
    if hasattr(value, "tolist"):
        return value.tolist()
    if isinstance(value, Mapping):
        return dict(value)
    raise TypeError(f"{type(value).__name__} has no form on the wire.")


def _check_finite(value: Any, pointer: str) -> None:
    if isinstance(value, float) and not math.isfinite(value):
        raise NotSent(f"{pointer or '/'} is {value}; every number of a request is finite.")
    if isinstance(value, dict):
        for name, item in value.items():
            _check_finite(item, f"{pointer}/{name}")
    elif isinstance(value, list | tuple):
        for index, item in enumerate(value):
            _check_finite(item, f"{pointer}/{index}")
