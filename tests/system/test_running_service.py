"""The running service with the client, the demonstration, and the commands."""

import json
import os
import re
import socket
import subprocess
import sys
from http.client import HTTPConnection
from typing import Any

import pytest

import crossbank
from crossbank import Client
from crossbank.errors import InvalidInput
from crossbank_service.demo import free_port, running_service
from crossbank_service.http.examples import examples


@pytest.mark.parametrize("media", ["json", "msgpack"])
def test_the_client_rates_every_example(url: str, media: str) -> None:
    """Heat is gained on the cold side: signs, balance and hash as the contract says."""
    with Client(url, media=media) as client:
        for body in examples().values():
            result = client.rate_request(body)
            gained = result.outside.outlet_temperature_k - result.outside.inlet_temperature_k
            assert result.duty_w * gained > 0.0
            assert result.heat_balance_residual < 1e-6
            assert result.record.service_version == crossbank.__version__


def test_the_process_and_this_one_give_the_same_bytes(url: str) -> None:
    """The service in a process of its own and the one inside the caller agree to the last bit."""
    with Client(url) as far, crossbank.local() as near:
        for body in examples().values():
            call = crossbank.calls.rate_request(body)
            assert far.send(call).content == near.send(call).content


def test_a_refusal_arrives_as_an_error_of_the_client(url: str) -> None:
    """With the pointer and the request's id."""
    body: dict[str, Any] = json.loads(json.dumps(examples()["veneer-dryer-heater"]))
    body["outside"]["inlet_temperature_k"] = -5
    with Client(url) as client, pytest.raises(InvalidInput) as caught:
        client.rate_request(body)
    assert caught.value.errors[0].pointer == "/outside/inlet_temperature_k"
    assert "268.15 K" in caught.value.errors[0].detail
    assert caught.value.request_id


def test_the_catalogues_arrive(url: str) -> None:
    """Every catalogue call of the client is answered."""
    with Client(url) as client:
        assert client.health()
        assert {record.slug for record in client.fluids()} >= {"water", "air"}
        assert {record.slug for record in client.materials()} >= {"carbon-steel"}
        assert client.notices()
        assert client.service().contract == "1"
        slugs = {record.slug for record in client.methods()}
        assert "zukauskas-1987" in slugs
        found = client.evaluate(
            "zukauskas-1987",
            reynolds=[1e3, 1e4],
            prandtl=0.7,
            transverse_pitch_ratio=2.0,
            longitudinal_pitch_ratio=2.0,
            arrangement="staggered",
            rows=10,
        )
        assert isinstance(found.values, list)
        assert found.values[0] < found.values[1]


def _get(url: str, path: str) -> tuple[int, str]:
    connection = HTTPConnection(url.removeprefix("http://"), timeout=30)
    try:
        connection.request("GET", path)
        response = connection.getresponse()
        return response.status, response.read().decode()
    finally:
        connection.close()


def test_the_page_needs_no_outside_address(url: str) -> None:
    """As the server sends it."""
    status, page = _get(url, "/docs")
    assert status == 200
    assert not re.findall(r"https?:|<script|@import|url\(", page)


@pytest.mark.parametrize(
    ("sent", "status"),
    [
        (b"GET /docs HTTP/1.1\r\nHost: x\r\nConnection: close\r\n\r\n", b"200"),
        (b"HEAD /health/ready HTTP/1.1\r\nHost: x\r\nConnection: close\r\n\r\n", b"200"),
        (b"POST /v1/rate HTTP/1.1\r\nHost: x\r\nConnection: close\r\nContent-Length: 0\r\n\r\n", b"415"),
        (b"GET /%2e%2e/%00 HTTP/1.1\r\nHost: x\r\nConnection: close\r\n\r\n", b"404"),
    ],
)
def test_raw_requests_are_answered(url: str, sent: bytes, status: bytes) -> None:
    """The status line over a bare socket."""
    host, port = url.removeprefix("http://").split(":")
    with socket.create_connection((host, int(port)), timeout=30) as connection:
        connection.sendall(sent)
        answer = b""
        while piece := connection.recv(65536):
            answer += piece
    assert answer.split(b" ", 2)[1] == status


def test_the_service_writes_its_log_as_json_lines() -> None:
    """A served process logs to standard output without being told to."""
    port = free_port()
    environment = os.environ | {"CROSSBANK_LOG_INPUT": "on"}
    command = [sys.executable, "-m", "crossbank_service", "serve", "--port", str(port)]
    process = subprocess.Popen(command, stdout=subprocess.PIPE, stderr=subprocess.DEVNULL, env=environment)
    try:
        with Client(f"http://127.0.0.1:{port}", retries=10) as client:
            client.rate_request(examples()["veneer-dryer-heater"])
    finally:
        process.terminate()
        output, _ = process.communicate(timeout=30)
    lines = [json.loads(line) for line in output.splitlines() if line.startswith(b"{")]
    (calculation,) = [line for line in lines if line["event"] == "calculation"]
    assert calculation["input"]["bank"]["layout"]["rows"] == 12
    assert {"/v1/rate"} == {line["route"] for line in lines if line["event"] == "access"}


def test_two_workers_answer_alike() -> None:
    """Every process gives the same bytes."""
    environment = {key: value for key, value in os.environ.items() if not key.startswith("CROSSBANK_")}
    with running_service(free_port(), environment, workers=2) as address:
        answers = set()
        for _ in range(8):
            with Client(address) as client:
                answers.add(
                    client.send(crossbank.calls.rate_request(examples()["veneer-dryer-heater"])).content
                )
    assert len(answers) == 1


def test_the_demonstration_runs() -> None:
    """It rates every example, prints a table with units and stops what it started."""
    done = subprocess.run(
        [sys.executable, "-m", "crossbank_service.demo"],
        capture_output=True,
        text=True,
        timeout=120,
        check=False,
    )
    assert done.returncode == 0, done.stdout + done.stderr
    for name in examples():
        assert name in done.stdout
    assert re.search(r"duty +kW +-?\d", done.stdout)
    assert "/docs" in done.stdout
    found = re.search(r"http://127\.0\.0\.1:(\d+)", done.stdout)
    assert found
    with socket.socket() as probe:
        assert probe.connect_ex(("127.0.0.1", int(found[1]))) != 0


def test_an_unusable_setting_stops_the_start() -> None:
    """The command says which variable and leaves with 2."""
    done = subprocess.run(
        [sys.executable, "-m", "crossbank_service", "serve"],
        env=os.environ | {"CROSSBANK_LOG": "everywhere"},
        capture_output=True,
        text=True,
        timeout=60,
        check=False,
    )
    assert done.returncode == 2
    assert "CROSSBANK_LOG" in done.stderr
