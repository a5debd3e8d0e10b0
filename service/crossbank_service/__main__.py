"""The command ``crossbank-service``: serve, and write the OpenAPI document."""

import argparse
import sys
from collections.abc import Sequence
from pathlib import Path

import granian
from granian.constants import Interfaces

from crossbank_service.http import Settings, create_app
from crossbank_service.http.document import document_bytes
from crossbank_service.http.settings import SettingsError

DOCUMENT = Path("openapi/openapi.json")


def main(arguments: Sequence[str] | None = None) -> int:
    """Run the command.

    Parameters
    ----------
    arguments : sequence of str, optional
        The words after the command's name; by default those of the process.

    Returns
    -------
    int
        Exit code: 0 done, 1 the committed document is out of date, 2 cannot be done as asked.
    """
    parser = argparse.ArgumentParser(
        prog="crossbank-service", description="Rates crossflow tube banks over HTTP."
    )
    commands = parser.add_subparsers(dest="command", required=True)
    serve = commands.add_parser("serve", help="run the service until it is interrupted")
    serve.add_argument(
        "--host", default="127.0.0.1", help="address to listen on (default: this machine only)"
    )
    serve.add_argument("--port", type=int, default=8000, help="port to listen on (default: 8000)")
    serve.add_argument("--workers", type=int, default=1, help="processes, about one a core (default: 1)")
    document = commands.add_parser("openapi", help=f"write the OpenAPI document to {DOCUMENT}")
    document.add_argument("--check", action="store_true", help="only compare; exit 1 if it is out of date")
    document.add_argument("--output", type=Path, default=DOCUMENT, help="another file, - for standard output")
    given = parser.parse_args(arguments)
    if given.command == "serve":
        return _serve(given.host, given.port, given.workers)
    return _openapi(given.output, check=given.check)


def _serve(host: str, port: int, workers: int) -> int:
    try:
        Settings.from_environment()
    except SettingsError as error:
        sys.stderr.write(f"crossbank-service: {error}\n")
        return 2
    granian.Granian(
        "crossbank_service.http:served_app",
        address=host,
        port=port,
        interface=Interfaces.ASGI,
        factory=True,
        workers=workers,
        log_access=False,
    ).serve()
    return 0


def _openapi(output: Path, *, check: bool) -> int:
    content = document_bytes(create_app(Settings()).application)
    if str(output) == "-":
        sys.stdout.buffer.write(content)
        return 0
    if not check:
        output.parent.mkdir(parents=True, exist_ok=True)
        output.write_bytes(content)
        return 0
    if output.exists() and output.read_bytes() == content:
        return 0
    sys.stderr.write(f"{output} is out of date; write it again with: crossbank-service openapi\n")
    return 1


if __name__ == "__main__":
    sys.exit(main())
