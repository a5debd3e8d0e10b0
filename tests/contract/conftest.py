"""The service in this process, over its real interface, for the contract tests."""

import copy
import io
from collections.abc import Callable, Iterator
from typing import Any

import httpx
import msgspec
import pytest

from crossbank._asgi import AppTransport
from crossbank_service.http import Settings, create_app
from crossbank_service.http.examples import examples
from crossbank_service.record import EventLog

Body = dict[str, Any]


@pytest.fixture(scope="module")
def service() -> Iterator[httpx.Client]:
    """Give a connection to a service of its own, with default settings."""
    with httpx.Client(transport=AppTransport(create_app(Settings())), base_url="http://service") as client:
        yield client


@pytest.fixture
def body() -> Body:
    """Give a sound rating request that a test may change."""
    return copy.deepcopy(examples()["veneer-dryer-heater"])


class Logged:
    """A service of its own with its log kept."""

    def __init__(self, client: httpx.Client, stream: io.StringIO) -> None:
        self.client = client
        self.stream = stream

    def lines(self, event: str) -> list[dict[str, Any]]:
        """Give the lines of one kind."""
        every = [msgspec.json.decode(line) for line in self.stream.getvalue().splitlines()]
        return [line for line in every if line["event"] == event]


@pytest.fixture
def logged() -> Iterator[Callable[[Settings], Logged]]:
    """Give a maker of services whose log can be read."""
    clients = []

    def make(settings: Settings) -> Logged:
        stream = io.StringIO()
        app = create_app(settings, log=EventLog(stream=stream))
        client = httpx.Client(transport=AppTransport(app), base_url="http://service")
        clients.append(client)
        return Logged(client, stream)

    yield make
    for client in clients:
        client.close()
