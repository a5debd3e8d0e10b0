"""The service in the caller's process, here a small ASGI application of the tests."""

import asyncio
import gzip
import sys
import threading
import types
from collections.abc import Callable
from typing import Any

import msgspec
import pytest

import crossbank
from crossbank import errors
from crossbank._asgi import App


class Small:
    """An application that notes its lifespan and answers `GET /v1`, zipped."""

    def __init__(self, *, lifespan: str = "runs") -> None:
        self.lifespan = lifespan
        self.events: list[str] = []
        self.threads: set[int] = set()

    async def __call__(self, scope: Any, receive: Any, send: Any) -> None:
        """Serve one scope."""
        if scope["type"] == "lifespan":
            await self._live(receive, send)
            return
        self.threads.add(threading.get_ident())
        body = gzip.compress(
            msgspec.json.encode(
                {
                    "contract": "1",
                    "service_version": scope["path"],
                    "numbers": "1",
                    "properties": "p",
                    "limits": {"body_bytes": 1},
                }
            )
        )
        headers = [
            (b"content-type", b"application/json"),
            (b"content-encoding", b"gzip"),
            (b"x-request-id", b"r-1"),
        ]
        await send({"type": "http.response.start", "status": 200, "headers": headers})
        await send({"type": "http.response.body", "body": body})

    async def _live(self, receive: Any, send: Any) -> None:
        if self.lifespan == "unknown":
            raise ValueError("no lifespan here")
        assert (await receive())["type"] == "lifespan.startup"
        self.events.append("up")
        if self.lifespan == "fails":
            await send({"type": "lifespan.startup.failed", "message": "no fluids"})
            raise ValueError("no fluids")
        await send({"type": "lifespan.startup.complete"})
        assert (await receive())["type"] == "lifespan.shutdown"
        self.events.append("down")
        await send({"type": "lifespan.shutdown.complete"})


@pytest.fixture
def install(monkeypatch: pytest.MonkeyPatch) -> Callable[[App], None]:
    """Stand an application in for the service."""

    def put(app: App) -> None:
        module = types.ModuleType("crossbank_service.http")
        module.create_app = lambda: app  # type: ignore[attr-defined]
        monkeypatch.setitem(sys.modules, "crossbank_service.http", module)

    return put


def test_local_answers_from_an_own_thread_and_shuts_down(install: Callable[[App], None]) -> None:
    """The application starts once, answers every request in one other thread, and is shut down at the end."""
    app = Small()
    install(app)
    before = set(threading.enumerate())
    with crossbank.local() as client:
        assert client.service().service_version == "/v1"
        assert client.send(crossbank.calls.service()).request_id == "r-1"
        assert app.events == ["up"]
    assert app.events == ["up", "down"]
    assert len(app.threads) == 1
    assert threading.get_ident() not in app.threads
    assert not any(t.name == "crossbank-local" for t in set(threading.enumerate()) - before)


def test_local_serves_several_threads_at_once(install: Callable[[App], None]) -> None:
    """One local client may be shared between threads."""
    install(Small())
    got: list[str] = []
    with crossbank.local() as client:
        threads = [threading.Thread(target=lambda: got.append(client.service().contract)) for _ in range(8)]
        for thread in threads:
            thread.start()
        for thread in threads:
            thread.join()
    assert got == ["1"] * 8


def test_alocal_answers_in_the_callers_loop(install: Callable[[App], None]) -> None:
    """The async form runs the application, lifespan included, in the caller's event loop."""
    app = Small()
    install(app)

    async def run() -> str:
        async with crossbank.alocal() as client:
            return (await client.service()).service_version

    assert asyncio.run(run()) == "/v1"
    assert app.events == ["up", "down"]
    assert app.threads == {threading.get_ident()}


def test_an_application_without_a_lifespan_is_fine(install: Callable[[App], None]) -> None:
    """The lifespan is optional in ASGI."""
    install(Small(lifespan="unknown"))
    with crossbank.local() as client:
        assert client.health()


def test_a_service_that_does_not_start_says_why(install: Callable[[App], None]) -> None:
    """A failed startup is reported to the caller, in both forms."""
    install(Small(lifespan="fails"))
    with crossbank.local() as client, pytest.raises(errors.ConnectionFailed, match="no fluids"):
        client.service()

    async def run() -> None:
        async with crossbank.alocal() as client:
            await client.service()

    with pytest.raises(errors.ConnectionFailed, match="no fluids"):
        asyncio.run(run())


@pytest.mark.parametrize("make", [crossbank.local, crossbank.alocal])
def test_without_the_extra_local_says_what_to_install(make: Any, monkeypatch: pytest.MonkeyPatch) -> None:
    """A missing service names the extra that brings it."""
    monkeypatch.setitem(sys.modules, "crossbank_service.http", None)
    with pytest.raises(ImportError, match=r"crossbank\[service\]"):
        make()
