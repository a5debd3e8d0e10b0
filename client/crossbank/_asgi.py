"""Transports that run an ASGI application in this process, its lifespan included."""

import threading
from collections.abc import Awaitable, Callable, MutableMapping
from types import TracebackType
from typing import Any, Self

import anyio
import anyio.from_thread
import httpx

from crossbank.errors import ConnectionFailed

Message = MutableMapping[str, Any]
Receive = Callable[[], Awaitable[Message]]
Send = Callable[[Message], Awaitable[None]]
App = Callable[[Message, Receive, Send], Awaitable[None]]


class Lifespan:
    """Startup and shutdown of an ASGI application (the lifespan protocol), within one task."""

    def __init__(self, app: App) -> None:
        self._app = app
        self._started, self._stop, self._stopped = anyio.Event(), anyio.Event(), anyio.Event()
        self._asked = False
        self._refusal: str | None = None

    async def run(self) -> None:
        """Speak the protocol until :meth:`stop`; an application without a lifespan is fine."""
        scope: Message = {"type": "lifespan", "asgi": {"version": "3.0", "spec_version": "2.0"}, "state": {}}
        try:
            await self._app(scope, self._receive, self._send)
        except Exception:
            # an application without a lifespan may raise; one that failed to start says so itself
            if self._started.is_set() and self._refusal is None and not self._stop.is_set():
                raise
        finally:
            self._started.set()
            self._stopped.set()

    async def started(self) -> None:
        """Wait until the application is ready."""
        await self._started.wait()
        if self._refusal is not None:
            raise ConnectionFailed(f"The service did not start: {self._refusal}")

    async def stop(self) -> None:
        """Shut the application down and wait for it."""
        self._stop.set()
        await self._stopped.wait()

    async def _receive(self) -> Message:
        if not self._asked:
            self._asked = True
            return {"type": "lifespan.startup"}
        await self._stop.wait()
        return {"type": "lifespan.shutdown"}

    async def _send(self, message: Message) -> None:
        if message["type"] == "lifespan.startup.failed":
            self._refusal = message.get("message") or "no reason given"
        if message["type"].startswith("lifespan.startup."):
            self._started.set()


class AsyncAppTransport(httpx.AsyncBaseTransport):
    """Answers requests from an application in the running event loop; enter it to run the lifespan."""

    def __init__(self, app: App) -> None:
        self._app = app
        self._inner = httpx.ASGITransport(app=app)
        self._lifespan: Lifespan | None = None
        self._tasks: Any = None

    async def __aenter__(self) -> Self:
        self._lifespan = Lifespan(self._app)
        self._tasks = anyio.create_task_group()
        await self._tasks.__aenter__()
        self._tasks.start_soon(self._lifespan.run)
        try:
            await self._lifespan.started()
        except BaseException:
            await self._tasks.__aexit__(None, None, None)
            raise
        return self

    async def __aexit__(
        self,
        kind: type[BaseException] | None = None,
        fault: BaseException | None = None,
        trace: TracebackType | None = None,
    ) -> None:
        if self._lifespan is not None:
            await self._lifespan.stop()
            await self._tasks.__aexit__(None, None, None)
            self._lifespan = None

    async def handle_async_request(self, request: httpx.Request) -> httpx.Response:
        """Answer one request."""
        return await self._inner.handle_async_request(request)


class AppTransport(httpx.BaseTransport):
    """Answers requests from an application that runs in an event loop of its own, in a thread of its own.

    The thread is started by the first request and is a daemon: a client that is never closed does not keep
    the process alive.
    """

    def __init__(self, app: App) -> None:
        self._app = app
        self._lock = threading.Lock()
        self._portal: anyio.from_thread.BlockingPortal | None = None
        self._thread: threading.Thread | None = None
        self._fault: BaseException | None = None

    def handle_request(self, request: httpx.Request) -> httpx.Response:
        """Answer one request; may be called from several threads at once."""
        request.read()
        return self._running().call(self._answer, request)

    def close(self) -> None:
        """Shut the application down and end the thread."""
        with self._lock:
            portal, thread = self._portal, self._thread
            self._portal = self._thread = None
        if portal is not None and thread is not None:
            portal.call(portal.stop)
            thread.join()

    def _running(self) -> anyio.from_thread.BlockingPortal:
        with self._lock:
            if self._portal is None:
                ready = threading.Event()
                self._fault = None
                self._thread = threading.Thread(
                    target=self._loop, args=(ready,), name="crossbank-local", daemon=True
                )
                self._thread.start()
                ready.wait()
            if self._portal is None:
                raise ConnectionFailed(str(self._fault)) from self._fault
            return self._portal

    def _loop(self, ready: threading.Event) -> None:
        async def serve() -> None:
            async with (
                AsyncAppTransport(self._app) as transport,
                anyio.from_thread.BlockingPortal() as portal,
            ):
                self._transport = transport
                self._portal = portal
                ready.set()
                await portal.sleep_until_stopped()

        try:
            anyio.run(serve)
        except BaseException as fault:  # noqa: BLE001  handed to the caller's thread
            self._fault = fault
        finally:
            ready.set()

    async def _answer(self, request: httpx.Request) -> httpx.Response:
        copy = httpx.Request(request.method, request.url, headers=request.headers, content=request.content)
        response = await self._transport.handle_async_request(copy)
        raw = b"".join([part async for part in response.aiter_raw()])
        return httpx.Response(response.status_code, headers=response.headers, content=raw)
