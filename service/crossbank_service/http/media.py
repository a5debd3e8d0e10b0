"""Reads bodies strictly, and writes answers in the form the caller accepts.

The framework's own body parameter is lenient (it takes ``"1"`` for a number and JSON of any media type), so
bodies are decoded here.
"""

import json
from functools import cache
from typing import Any, TypeVar

import msgspec

from crossbank_service.errors import Fault, InvalidInput
from crossbank_service.http.faults import find_faults, whole
from crossbank_service.http.problems import Refusal

T = TypeVar("T", bound=msgspec.Struct)

JSON, MSGPACK, MSGPACK_VENDOR = "application/json", "application/msgpack", "application/vnd.msgpack"
READ = (JSON, MSGPACK, MSGPACK_VENDOR)

_JSON_ENCODER = msgspec.json.Encoder()
_MSGPACK_ENCODER = msgspec.msgpack.Encoder()


class UnsoundError(ArithmeticError):
    """An answer holds something its type excludes, such as a number that is not finite."""


def read(body: bytes, content_type: str, content_encoding: str, body_type: type[T]) -> T:
    """Decode a body as a struct of the contract.

    Parameters
    ----------
    body : bytes
        The body as sent.
    content_type, content_encoding : str
        The headers of the request, '' where absent.
    body_type : type
        A closed struct.

    Raises
    ------
    Refusal
        ``unsupported-media``, or ``malformed`` where the bytes are not JSON or MessagePack.
    InvalidInput
        The body breaks the contract; every offending member is named.
    """
    media = _media_of(content_type, content_encoding)
    try:
        return _decode(body, media, body_type)
    except (msgspec.DecodeError, UnicodeDecodeError) as error:
        raise Refusal("malformed", f"The body is not {_spoken(media)}: {error}.") from None
    except RecursionError:
        raise Refusal("malformed", "The body is nested too deeply to be read.") from None


def negotiate(accept: str, offers: tuple[str, ...] = (JSON, MSGPACK, MSGPACK_VENDOR)) -> str:
    """Choose the media type of the answer from an ``Accept`` header (RFC 9110, section 12.5.1).

    Raises
    ------
    Refusal
        ``not-acceptable`` where none of the offers is accepted.
    """
    if not accept.strip():
        return offers[0]
    ranges = [_media_range(part) for part in accept.split(",") if part.strip()]
    best, best_quality = "", 0.0
    for offer in offers:
        matching = [r for r in ranges if _matches(r[0], offer)]
        # the most specific range decides
        quality = max(matching, key=lambda r: _specificity(r[0]))[1] if matching else 0.0
        if quality > best_quality:
            best, best_quality = offer, quality
    if not best:
        raise Refusal("not-acceptable", f"Available: {', '.join(offers)}.")
    # one spelling of MessagePack is answered, whichever was asked for
    return MSGPACK if best == MSGPACK_VENDOR else best


def write(answer: msgspec.Struct, media: str) -> bytes:
    """Encode an answer.

    Raises
    ------
    UnsoundError
        The answer holds a number that is not finite or beyond the bounds of its own type.
    """
    packed = _MSGPACK_ENCODER.encode(answer)
    try:
        # every number of an answer has both bounds, so reading it back refuses NaN and infinities
        _decoder(MSGPACK, type(answer)).decode(packed)
    except msgspec.ValidationError as error:
        raise UnsoundError(f"{type(answer).__name__}: {error}") from error
    return packed if media == MSGPACK else _JSON_ENCODER.encode(answer)


def _media_of(content_type: str, content_encoding: str) -> str:
    name, _, parameters = content_type.partition(";")
    media = name.strip().lower()
    if media not in READ:
        given = f"not {media}" if media else "and say so in Content-Type"
        raise Refusal("unsupported-media", f"Send {' or '.join(READ)}, {given}.")
    charset = parameters.partition("charset=")[2].strip().strip('"').lower()
    if charset not in {"", "utf-8", "utf8"}:
        raise Refusal("unsupported-media", f"Send UTF-8, not {charset}.")
    if content_encoding.strip().lower() not in {"", "identity"}:
        raise Refusal("unsupported-media", "Send the body without Content-Encoding.")
    return JSON if media == JSON else MSGPACK


def _decode(body: bytes, media: str, body_type: type[T]) -> T:
    try:
        typed: T = _decoder(media, body_type).decode(body)
    except msgspec.ValidationError as refusal:
        raw = _raw(body, media)
        try:
            # JSON Schema counts 60.0 as an integer, msgspec does not
            return msgspec.convert(whole(raw), body_type)
        except msgspec.ValidationError:
            faults = find_faults(body_type, raw, refusal)
            raise InvalidInput(_summary(faults), faults) from None
    return typed


def _raw(body: bytes, media: str) -> Any:
    if media == MSGPACK:
        return msgspec.msgpack.decode(body)
    try:
        return msgspec.json.decode(body)
    except msgspec.ValidationError:
        # well-formed, but with a number beyond all floats such as 1e999
        return json.loads(body)


@cache
def _decoder(media: str, body_type: Any) -> Any:
    return (msgspec.json.Decoder if media == JSON else msgspec.msgpack.Decoder)(body_type)


def _summary(faults: list[Fault]) -> str:
    if len(faults) == 1:
        return f"{faults[0].pointer or 'The body'}: {faults[0].detail}"
    return (
        f"{len(faults)} members do not fit; the first, {faults[0].pointer or 'the body'}: {faults[0].detail}"
    )


def _spoken(media: str) -> str:
    return "JSON" if media == JSON else "MessagePack"


def _media_range(part: str) -> tuple[str, float]:
    name, *parameters = part.split(";")
    quality = 1.0
    for parameter in parameters:
        key, _, value = parameter.partition("=")
        if key.strip().lower() == "q":
            try:
                quality = min(max(float(value), 0.0), 1.0)
            except ValueError:
                quality = 0.0
    return name.strip().lower(), quality


def _matches(media_range: str, offer: str) -> bool:
    return media_range in {"*/*", offer} or (
        media_range.endswith("/*") and offer.startswith(media_range.removesuffix("*"))
    )


def _specificity(media_range: str) -> int:
    return 0 if media_range == "*/*" else 1 if media_range.endswith("/*") else 2
