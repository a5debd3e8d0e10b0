"""One JSON object a line, with the time, on a stream of the operator's choice."""

import sys
from typing import Any, TextIO

import msgspec
import structlog


class EventLog:
    """Writes events as lines of JSON; nothing global is configured.

    Parameters
    ----------
    destination : str
        ``off``, ``stdout`` or ``stderr``.
    stream : file object, optional
        Takes the lines in place of the destination.
    """

    def __init__(self, destination: str = "off", stream: TextIO | None = None) -> None:
        if stream is None and destination != "off":
            stream = {"stdout": sys.stdout, "stderr": sys.stderr}[destination]
        self._logger: Any = None
        if stream is not None:
            self._logger = structlog.wrap_logger(
                structlog.WriteLogger(stream),
                processors=[
                    structlog.processors.TimeStamper(fmt="iso", utc=True),
                    structlog.processors.format_exc_info,
                    structlog.processors.JSONRenderer(serializer=_encode),
                ],
                wrapper_class=structlog.BoundLogger,
            )

    @property
    def on(self) -> bool:
        """Whether lines go anywhere."""
        return self._logger is not None

    def write(self, event: str, **members: Any) -> None:
        """Write one line; members keep their order."""
        if self._logger is not None:
            self._logger.info(event, **members)

    def failure(self, event: str, error: BaseException, **members: Any) -> None:
        """Write one line with the traceback of an unexpected error."""
        if self._logger is not None:
            self._logger.error(event, exc_info=error, **members)


def _encode(value: Any, **_: Any) -> str:
    return msgspec.json.encode(value, enc_hook=str).decode()
