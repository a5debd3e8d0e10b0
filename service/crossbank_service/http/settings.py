"""What an operator can set, and the environment variables for it."""

import os
from collections.abc import Callable, Mapping
from dataclasses import dataclass, fields
from typing import Any, Self

PREFIX = "CROSSBANK_"

# container orchestrators announce a service named crossbank under these
_SET_BY_ORCHESTRATORS = (PREFIX + "SERVICE_", PREFIX + "PORT")

_DIGEST_LENGTH = 64


class SettingsError(ValueError):
    """An environment variable holds something the service cannot use; the text names it."""


@dataclass(frozen=True, kw_only=True)
class Settings:
    """Settings of one application; each is read from ``CROSSBANK_`` and the name in capitals.

    Attributes
    ----------
    max_body_bytes : int
        Greatest request body accepted; a larger one is answered with 413.
    calculation_threads : int
        Worker threads that calculate beside the event loop. More threads keep the service answering,
        they do not make it faster: that is what more worker processes are for.
    log : str
        Where access lines and the calculation log go: ``off``, ``stdout`` or ``stderr``.
    log_input : bool
        Whether the calculation log also holds the canonical input, so that a case can be repeated.
    api_key_sha256 : tuple of str
        SHA-256 digests (hexadecimal) of the accepted API keys, separated by commas in the
        environment; none: no key is asked for.
    warm_up : bool
        Whether one rating is run at the start, before the service calls itself ready.
    """

    max_body_bytes: int = 2_000_000
    calculation_threads: int = 4
    log: str = "off"
    log_input: bool = False
    api_key_sha256: tuple[str, ...] = ()
    warm_up: bool = True

    @classmethod
    def from_environment(cls, environment: Mapping[str, str] | None = None, **defaults: Any) -> Self:
        """Read the settings from the environment; ``defaults`` stand in for what is not set.

        Raises
        ------
        SettingsError
            A variable with the prefix is unknown or holds something unusable.
        """
        environment = os.environ if environment is None else environment
        known = {PREFIX + field.name.upper(): field.name for field in fields(cls)}
        values = dict(defaults)
        for variable, text in environment.items():
            if not variable.startswith(PREFIX) or variable.startswith(_SET_BY_ORCHESTRATORS):
                continue
            if variable not in known:
                raise SettingsError(f"{variable} is not a setting; there are: {', '.join(sorted(known))}")
            name = known[variable]
            values[name] = _READERS[name](variable, text.strip())
        return cls(**values)


def _count(variable: str, text: str) -> int:
    if not text.isascii() or not text.isdecimal() or int(text) < 1:
        raise SettingsError(f"{variable} must be a whole number above 0, not {text!r}")
    return int(text)


def _switch(variable: str, text: str) -> bool:
    if text not in {"on", "off"}:
        raise SettingsError(f"{variable} must be on or off, not {text!r}")
    return text == "on"


def _destination(variable: str, text: str) -> str:
    if text not in {"off", "stdout", "stderr"}:
        raise SettingsError(f"{variable} must be off, stdout or stderr, not {text!r}")
    return text


def _digests(variable: str, text: str) -> tuple[str, ...]:
    digests = tuple(part.strip().lower() for part in text.split(",") if part.strip())
    for digest in digests:
        if len(digest) != _DIGEST_LENGTH or set(digest) - set("0123456789abcdef"):
            # the text itself may be a key written here by mistake: it is not repeated
            raise SettingsError(
                f"{variable} must hold SHA-256 digests of {_DIGEST_LENGTH} hexadecimal digits"
            )
    return digests


_READERS: dict[str, Callable[[str, str], Any]] = {
    "max_body_bytes": _count,
    "calculation_threads": _count,
    "log": _destination,
    "log_input": _switch,
    "api_key_sha256": _digests,
    "warm_up": _switch,
}
