"""The command ``crossbank``: rate a file, hash a file, show an example.

Exit codes: 0 done, 2 the request or the file is at fault, 3 no usable answer from the service.
"""

import argparse
import os
import sys
from collections.abc import Sequence
from importlib import resources
from pathlib import Path
from typing import Any, TextIO

import msgspec

from crossbank import calls
from crossbank._local import local
from crossbank._version import __version__
from crossbank.client import BASE_URL, Client
from crossbank.contract import RateRequest, bank_sha256, input_sha256
from crossbank.errors import ApiError, CrossbankError, NotSent
from crossbank.report import rating, refusal
from crossbank.units import SYSTEMS

DONE, AT_FAULT, NO_ANSWER = 0, 2, 3


class _FileFault(Exception):
    """A file that cannot be used; the text is for the person who named it."""


def main(argv: Sequence[str] | None = None) -> int:
    """Run the command line; return the exit code."""
    options = _parser().parse_args(argv)
    try:
        code: int = options.run(options)
    except (_FileFault, NotSent, ImportError) as fault:
        _say(str(fault), sys.stderr)
        return AT_FAULT
    except ApiError as error:
        _say(refusal(error), sys.stderr)
        return AT_FAULT if error.status < 500 else NO_ANSWER
    except CrossbankError as fault:
        _say(str(fault), sys.stderr)
        return NO_ANSWER
    return code


def example_names() -> list[str]:
    """Names of the example bodies that come with the package."""
    folder = resources.files("crossbank") / "examples"
    return sorted(f.name.removesuffix(".json") for f in folder.iterdir() if f.name.endswith(".json"))


def example_text(name: str) -> str:
    """Text of an example body."""
    return (resources.files("crossbank") / "examples" / f"{name}.json").read_text(encoding="utf-8")


def _parser() -> argparse.ArgumentParser:
    parser = argparse.ArgumentParser(prog="crossbank", description="Rate crossflow tube banks.")
    parser.add_argument("--version", action="version", version=f"crossbank {__version__}")
    commands = parser.add_subparsers(required=True, metavar="command")

    rate = commands.add_parser("rate", help="rate the bank described in a JSON file")
    rate.add_argument("file", help="a request body; - reads standard input")
    where = rate.add_mutually_exclusive_group()
    where.add_argument(
        "--url",
        default=os.environ.get("CROSSBANK_URL", BASE_URL),
        help="where the service answers (default: $CROSSBANK_URL, else %(default)s)",
    )
    where.add_argument("--local", action="store_true", help="run the service in this process")
    rate.add_argument(
        "--units", choices=sorted(SYSTEMS), default="metric", help="units of the table (default: %(default)s)"
    )
    rate.add_argument("--json", action="store_true", help="print the answer as it came, in SI")
    rate.set_defaults(run=_rate)

    digest = commands.add_parser(
        "hash", help="print the input and bank hashes of a JSON file, without a service"
    )
    digest.add_argument("file", help="a request body; - reads standard input")
    digest.set_defaults(run=_hash)

    example = commands.add_parser("example", help="print an example body, or the names of all")
    example.add_argument("name", nargs="?", help="name of the example")
    example.set_defaults(run=_example)
    return parser


def _say(text: str, stream: TextIO | None = None) -> None:
    (stream or sys.stdout).write(text.rstrip("\n") + "\n")


def _read(name: str) -> bytes:
    if name == "-":
        return sys.stdin.buffer.read()
    try:
        return Path(name).read_bytes()
    except OSError as fault:
        raise _FileFault(f"{name}: {fault.strerror or fault}") from fault


def _rate(options: argparse.Namespace) -> int:
    try:
        body: Any = msgspec.json.decode(_read(options.file))
    except (msgspec.DecodeError, UnicodeDecodeError, RecursionError) as fault:
        raise _FileFault(f"{options.file} is not JSON: {fault}") from fault
    if not isinstance(body, dict):
        raise _FileFault(f"{options.file} holds no JSON object; a request is one, see: crossbank example")
    client = local() if options.local else Client(options.url, api_key=os.environ.get("CROSSBANK_API_KEY"))
    with client:
        answer = client.send(calls.rate_request(body))
    if options.json:
        _say(msgspec.json.format(answer.content, indent=2).decode())
    else:
        _say(rating(answer.value, options.units))
    return DONE


def _hash(options: argparse.Namespace) -> int:
    try:
        request = msgspec.json.decode(_read(options.file), type=RateRequest)
    except (msgspec.DecodeError, UnicodeDecodeError, RecursionError) as fault:
        raise _FileFault(f"{options.file} is not a request: {fault}") from fault
    _say(f"input {input_sha256('rate', request)}\nbank  {bank_sha256(request.bank)}")
    return DONE


def _example(options: argparse.Namespace) -> int:
    names = example_names()
    if options.name is None:
        _say("\n".join(names))
        return DONE
    if options.name not in names:
        raise _FileFault(f"There is no example {options.name}; there are: {', '.join(names)}")
    _say(example_text(options.name))
    return DONE


if __name__ == "__main__":
    sys.exit(main())
