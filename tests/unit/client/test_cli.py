"""The command line: reading files, tables in three systems of units, problems as a short list, exit codes."""

import io
import json
import subprocess
import sys
from collections.abc import Callable
from pathlib import Path
from typing import Any

import httpx
import msgspec
import pytest

from crossbank import Client, cli
from crossbank.contract import RateRequest, bank_sha256, input_sha256

Serve = Callable[[Callable[[httpx.Request], httpx.Response]], None]


@pytest.fixture
def serve(monkeypatch: pytest.MonkeyPatch) -> Serve:
    """Stand a handler in for the service behind ``--local`` and ``--url``."""

    def put(handler: Callable[[httpx.Request], httpx.Response]) -> None:
        transport = httpx.MockTransport(handler)
        monkeypatch.setattr(cli, "local", lambda: Client(transport=transport, retries=0))
        monkeypatch.setattr(
            cli, "Client", lambda url, api_key: Client(url, api_key=api_key, transport=transport, retries=0)
        )

    return put


@pytest.fixture
def file(tmp_path: Path, body: dict[str, Any]) -> Path:
    """Give a file with a request body."""
    path = tmp_path / "heater.json"
    path.write_text(json.dumps(body))
    return path


def ok(result: dict[str, Any]) -> Callable[[httpx.Request], httpx.Response]:
    """Answer every request with a result."""
    return lambda _: httpx.Response(200, json=result)


@pytest.mark.parametrize(
    ("system", "parts"),
    [
        ("metric", ["10.00 kW", "-5.0 °C", "0.0 °C", "40.0 Pa", "0.50 kPa", "80.0 W/(m²K)"]),
        ("si", ["10000 W", "268.15 K", "40.0 Pa", "500 Pa"]),
        # 10 kW = 34121 Btu/h, 268.15 K = 23.0 °F, 40 Pa = 0.161 inH2O, 500 Pa = 0.073 psi, 80 W/(m2K) = 14.09
        ("us", ["34121 Btu/h", "23.0 °F", "0.161 inH2O", "0.073 psi", "14.09 Btu/(h ft² °F)"]),
    ],
)
def test_rate_prints_a_table_with_units(
    serve: Serve,
    file: Path,
    result: dict[str, Any],
    capsys: pytest.CaptureFixture[str],
    *,
    system: str,
    parts: list[str],
) -> None:
    """The headline and the coefficients are shown in the chosen units."""
    serve(ok(result))
    assert cli.main(["rate", str(file), "--local", "--units", system]) == 0
    out = capsys.readouterr().out
    squeezed = " ".join(out.split())
    for part in parts:
        assert part in squeezed


def test_rate_shows_what_stands_behind_the_numbers(
    serve: Serve, file: Path, result: dict[str, Any], capsys: pytest.CaptureFixture[str]
) -> None:
    """Identity, rows, methods with source and range, assumptions, notices, other methods, hashes."""
    serve(ok(result))
    cli.main(["rate", str(file), "--local"])
    out = capsys.readouterr().out
    for part in (
        "veneer dryer heater  [H-1 / winter]",
        "Row by row",
        "zukauskas-1987 (OUTSIDE ITS RANGE, data scatter ±15 %)",
        "rows 2 is below 3",
        "Handbook of Single-Phase Convective Heat Transfer",
        "/bank/layout/side_gap_m = 0.0125 m: half the clear gap",
        "/bank/circuit/loss_coefficient = 1.5: common value",
        "caution hot-surface: Surfaces can burn.",
        "grimison-1937",
        "a" * 64,
        "b" * 64,
        "CoolProp 8.0.0",
    ):
        assert part in out
    assert all(len(line) <= 110 and line == line.rstrip() for line in out.splitlines())


def test_rate_of_a_bare_result_leaves_out_what_is_null(
    serve: Serve, file: Path, result: dict[str, Any], capsys: pytest.CaptureFixture[str]
) -> None:
    """A held surface has no inside stream, rows may be switched off: no empty blocks, no dashes for them."""
    result["label"] = result["reference"] = result["comparisons"] = None
    result["rows"] = result["assumed"] = result["notices"] = []
    result["inside"] = dict.fromkeys(result["inside"]) | {"kind": "held-surface"}
    result["overall"]["resistance_shares"] = None
    serve(ok(result))
    cli.main(["rate", str(file), "--local"])
    out = capsys.readouterr().out
    assert "In the tubes (held-surface)" in out
    for absent in ("Row by row", "Notices", "Assumed", "–", "Inside pressure drop", "Where the resistance"):
        assert absent not in out


def test_rate_prints_json_as_it_came(
    serve: Serve, file: Path, result: dict[str, Any], capsys: pytest.CaptureFixture[str]
) -> None:
    """With --json nothing is lost, a member of tomorrow included."""
    result["novelty"] = {"x": 1}
    serve(ok(result))
    assert cli.main(["rate", str(file), "--local", "--json"]) == 0
    assert json.loads(capsys.readouterr().out) == result


def test_rate_reads_standard_input_and_asks_the_url_with_the_key(
    serve: Serve,
    body: dict[str, Any],
    result: dict[str, Any],
    monkeypatch: pytest.MonkeyPatch,
) -> None:
    """`-` reads standard input; --url and the key from the environment reach the service."""
    seen: list[httpx.Request] = []

    def handler(request: httpx.Request) -> httpx.Response:
        seen.append(request)
        return httpx.Response(200, json=result)

    serve(handler)
    monkeypatch.setenv("CROSSBANK_API_KEY", "k-2")
    monkeypatch.setattr(sys, "stdin", io.TextIOWrapper(io.BytesIO(json.dumps(body).encode())))
    assert cli.main(["rate", "-", "--url", "http://mill.test:9000"]) == 0
    assert str(seen[0].url) == "http://mill.test:9000/v1/rate"
    assert seen[0].headers["x-api-key"] == "k-2"
    assert json.loads(seen[0].content) == body


def test_a_problem_prints_pointer_given_and_accepted(
    serve: Serve, file: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    """A problem document becomes a short list on standard error, exit code 2."""
    problem = {
        "type": "/problems/invalid-input",
        "title": "The request breaks the contract",
        "status": 422,
        "code": "invalid-input",
        "detail": "2 members are wrong.",
        "request_id": "r-3",
        "errors": [
            {
                "pointer": "/outside/inlet_temperature_k",
                "detail": "Temperatures are in kelvin.",
                "given": 25,
                "unit": "K",
                "at_least": 150,
                "at_most": 2500,
            },
            {
                "pointer": "/bank/layout/arrangement",
                "detail": "Not one of the words.",
                "given": "triangle",
                "one_of": ["inline", "staggered"],
            },
        ],
    }
    serve(
        lambda _: httpx.Response(
            422, content=json.dumps(problem).encode(), headers={"content-type": "application/problem+json"}
        )
    )
    assert cli.main(["rate", str(file), "--local"]) == 2
    caught = capsys.readouterr()
    assert caught.out == ""
    assert caught.err.splitlines() == [
        "2 members are wrong. (invalid-input)",
        "  /outside/inlet_temperature_k",
        "    given     25 K",
        "    accepted  150 to 2500 K",
        "    Temperatures are in kelvin.",
        "  /bank/layout/arrangement",
        "    given     triangle",
        "    accepted  inline, staggered",
        "    Not one of the words.",
        "  request r-3",
    ]


def test_no_service_is_exit_code_3(serve: Serve, file: Path, capsys: pytest.CaptureFixture[str]) -> None:
    """A service that cannot be reached is another kind of failure than a wrong request."""

    def handler(request: httpx.Request) -> httpx.Response:
        raise httpx.ConnectError("refused", request=request)

    serve(handler)
    assert cli.main(["rate", str(file)]) == 3
    assert "refused" in capsys.readouterr().err


@pytest.mark.parametrize("text", ["{", "[1]", "\x00", "[" * 100000, '{"a": NaN}'])
@pytest.mark.parametrize("command", [["rate", "--local"], ["hash"]])
def test_a_file_that_is_no_request_is_said_to_be_none(
    tmp_path: Path, capsys: pytest.CaptureFixture[str], text: str, command: list[str]
) -> None:
    """A file that is not JSON, or no object, is named with the reason, exit code 2."""
    path = tmp_path / "odd.json"
    path.write_text(text)
    assert cli.main([*command, str(path)]) == 2
    assert "odd.json" in capsys.readouterr().err


def test_a_missing_file_is_named(capsys: pytest.CaptureFixture[str]) -> None:
    """A file that is not there is named, exit code 2."""
    assert cli.main(["hash", "nowhere.json"]) == 2
    assert "nowhere.json" in capsys.readouterr().err


def test_hash_needs_no_service(file: Path, body: dict[str, Any], capsys: pytest.CaptureFixture[str]) -> None:
    """The hashes on the command line are those of the contract."""
    request = msgspec.convert(body, RateRequest)
    assert cli.main(["hash", str(file)]) == 0
    assert capsys.readouterr().out.split() == [
        "input",
        input_sha256("rate", request),
        "bank",
        bank_sha256(request.bank),
    ]


def test_examples_are_listed_and_printed(capsys: pytest.CaptureFixture[str]) -> None:
    """Without a name the names, with a name a body that reads; an unknown name lists the known."""
    assert cli.main(["example"]) == 0
    names = capsys.readouterr().out.split()
    assert {"veneer-dryer-heater", "press-section-heat-recovery", "boiler-house-economiser"} <= set(names)
    for name in names:
        assert cli.main(["example", name]) == 0
        assert msgspec.json.decode(capsys.readouterr().out, type=RateRequest).bank.layout.rows > 0
    assert cli.main(["example", "sauna"]) == 2
    assert "veneer-dryer-heater" in capsys.readouterr().err


def test_the_module_runs_as_a_command() -> None:
    """`python -m crossbank` is the same command line."""
    done = subprocess.run(
        [sys.executable, "-m", "crossbank", "--version"], capture_output=True, text=True, check=False
    )
    assert (done.returncode, done.stdout.split()[0]) == (0, "crossbank")
