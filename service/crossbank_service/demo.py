"""The command ``crossbank-demo``: start the service, rate the example banks, print what came back, stop.

The examples come from a plywood mill at an invented place.
"""

import argparse
import socket
import subprocess
import sys
import tempfile
import time
from collections.abc import Callable, Iterator, Sequence
from contextlib import contextmanager
from typing import IO, Any

from crossbank import ApiError, Client, CrossbankError, RateResult
from crossbank.table import paragraph
from crossbank_service.http.examples import examples

HOST = "127.0.0.1"
STARTING_SECONDS = 60.0
_CELSIUS_OFFSET = 273.15
_LOG_TAIL = 2000


class NotStartedError(RuntimeError):
    """The service did not become ready; the text holds the end of its log."""


def main(arguments: Sequence[str] | None = None) -> int:
    """Run the demonstration.

    Parameters
    ----------
    arguments : sequence of str, optional
        The words after the command's name; by default those of the process.

    Returns
    -------
    int
        Exit code: 0 every example was rated, 1 something went wrong.
    """
    parser = argparse.ArgumentParser(
        prog="crossbank-demo", description="Starts the service on this machine and rates its example banks."
    )
    parser.add_argument("--port", type=int, default=0, help="port of the service (default: a free one)")
    port = parser.parse_args(arguments).port or free_port()
    try:
        with running_service(port) as url:
            _say(f"The service runs at {url} on this machine only.\n")
            with Client(url) as client:
                results = {name: client.rate_request(body) for name, body in examples().items()}
            _report(results)
    except NotStartedError as error:
        _say(f"The service did not start.\n{error}")
        return 1
    except ApiError as error:
        _say(f"The service refused an example: {error}")
        return 1
    except CrossbankError as error:
        _say(f"The service could not be reached: {error}")
        return 1
    _say("The service has been stopped. To leave it running:\n")
    _say("    crossbank-service serve --port 8000\n")
    _say(f"then look at http://{HOST}:8000/docs, or rate an example from another terminal:\n")
    _say(f"    crossbank example veneer-dryer-heater | crossbank rate - --url http://{HOST}:8000")
    return 0


def free_port() -> int:
    """Ask the system for a port that nobody listens on."""
    with socket.socket() as probe:
        probe.bind((HOST, 0))
        port: int = probe.getsockname()[1]
    return port


@contextmanager
def running_service(
    port: int, environment: dict[str, str] | None = None, *, workers: int = 1
) -> Iterator[str]:
    """Run the service in a process of its own and give its address once it is ready.

    Parameters
    ----------
    port : int
        Port to listen on.
    environment : dict, optional
        Environment of the process; by default this process's own.
    workers : int
        Worker processes.

    Raises
    ------
    NotStartedError
        It ended, or was not ready in time.
    """
    command = [sys.executable, "-m", "crossbank_service", "serve", "--host", HOST, "--port", str(port)]
    command += ["--workers", str(workers)]
    with tempfile.TemporaryFile() as log:
        process = subprocess.Popen(command, stdout=log, stderr=subprocess.STDOUT, env=environment)  # noqa: S603  our own command
        try:
            url = f"http://{HOST}:{port}"
            _wait_until_ready(url, process, log)
            yield url
        finally:
            process.terminate()
            try:
                process.wait(timeout=10)
            except subprocess.TimeoutExpired:
                process.kill()
                process.wait()


def _wait_until_ready(url: str, process: "subprocess.Popen[bytes]", log: IO[bytes]) -> None:
    until = time.monotonic() + STARTING_SECONDS
    with Client(url, retries=0, timeout=5.0) as client:
        while process.poll() is None and time.monotonic() < until:
            try:
                if client.health():
                    return
            except CrossbankError:
                pass
            time.sleep(0.1)
    log.seek(0)
    raise NotStartedError(log.read()[-_LOG_TAIL:].decode(errors="replace"))


def _report(results: dict[str, RateResult]) -> None:
    _say("Example banks of a plywood mill\n")
    for number, (name, result) in enumerate(results.items(), start=1):
        _say(f"  {number}  {name}: {result.label}")
    _say("")
    columns = [_column(result) for result in results.values()]
    _say(_line("", "", [str(number) for number in range(1, len(results) + 1)]))
    for i, (quantity, unit, _) in enumerate(columns[0]):
        _say(_line(quantity, unit, [column[i][2] for column in columns]))
    _say("\nMethods behind these numbers")
    _say_once(results, _methods)
    _say("\nNotices")
    _say_once(results, _notices)
    _say("")


def _say_once(results: dict[str, RateResult], texts_of: Callable[[RateResult], list[str]]) -> None:
    """Print each text once, with the numbers of the examples it belongs to."""
    owners: dict[str, list[str]] = {}
    for number, result in enumerate(results.values(), start=1):
        for text in texts_of(result):
            owners.setdefault(text, []).append(str(number))
    for text, numbers in owners.items():
        _say(paragraph(f"{','.join(numbers):<{2 * len(results)}}{text}", then=" " * (2 * len(results) + 2)))


def _methods(result: RateResult) -> list[str]:
    texts = []
    for used in result.methods:
        scatter = "" if used.scatter_fraction is None else f", scatter ±{100 * used.scatter_fraction:.0f} %"
        outside = "" if used.in_range else "; OUTSIDE ITS RANGE"
        texts.append(f"{used.role.replace('_', ' ')}: {used.method}{scatter}{outside}")
    return texts


def _notices(result: RateResult) -> list[str]:
    return [f"{notice.severity}, {notice.code}: {notice.text}" for notice in result.notices]


def _line(quantity: str, unit: str, values: list[str]) -> str:
    return f"  {quantity:<24}{unit:<10}" + "".join(f"{value:>10}" for value in values)


def _column(result: RateResult) -> list[tuple[str, str, str]]:
    out, ins, overall = result.outside, result.inside, result.overall
    return [
        ("duty", "kW", _number(result.duty_w, 1e3)),
        ("outside, in", "°C", _celsius(out.inlet_temperature_k)),
        ("outside, out", "°C", _celsius(out.outlet_temperature_k)),
        ("outside flow", "kg/s", _number(out.mass_flow_kg_s)),
        ("outside pressure drop", "Pa", _number(out.pressure_drop_pa)),
        ("inside, in", "°C", _celsius(ins.inlet_temperature_k)),
        ("inside, out", "°C", _celsius(ins.outlet_temperature_k)),
        ("inside flow", "kg/s", _number(ins.mass_flow_kg_s)),
        ("inside pressure drop", "kPa", _number(ins.pressure_drop_pa, 1e3)),
        ("outside coefficient", "W/(m² K)", _number(out.heat_transfer_coefficient_w_m2_k)),
        ("overall coefficient", "W/(m² K)", _number(overall.coefficient_w_m2_k)),
        ("outside area", "m²", _number(overall.area_m2)),
        ("hottest wall", "°C", _celsius(result.wall.max_temperature_k)),
        ("coldest wall", "°C", _celsius(result.wall.min_temperature_k)),
    ]


def _number(value: float | None, of: float = 1.0) -> str:
    return "–" if value is None else f"{value / of:.4g}"


def _celsius(kelvin: float | None) -> str:
    return "–" if kelvin is None else f"{kelvin - _CELSIUS_OFFSET:.1f}"


def _say(text: Any) -> None:
    sys.stdout.write(f"{text}\n")
    sys.stdout.flush()


if __name__ == "__main__":
    sys.exit(main())
