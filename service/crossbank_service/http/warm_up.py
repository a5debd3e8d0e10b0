"""The start: load the property library and run one rating before the service calls itself ready."""

import asyncio
from collections.abc import AsyncIterator
from concurrent.futures import ThreadPoolExecutor
from contextlib import asynccontextmanager

import msgspec
from litestar import Litestar

from crossbank.contract import RateRequest
from crossbank_service import rating
from crossbank_service.errors import CoreError
from crossbank_service.http.examples import examples


class WarmUp:
    """Whether the start is over, and whether it went well."""

    def __init__(self) -> None:
        self.done = False
        self.failed = False

    def run(self) -> None:
        """Rate the first example; the property tables it needs are then built.

        Raises
        ------
        CoreError
            The example was refused: the service is not fit to serve.
        """
        body = next(iter(examples().values()))
        self.failed = True
        answer = rating.rate([msgspec.convert(body, RateRequest)])[0]
        if isinstance(answer, CoreError):
            raise answer
        self.done, self.failed = True, False


@asynccontextmanager
async def workers(app: Litestar) -> AsyncIterator[None]:
    """Hold the worker threads while the application runs, and warm them up beside the first requests."""
    settings = app.state.settings
    with ThreadPoolExecutor(settings.calculation_threads, "calculation") as executor:
        app.state.executor = executor
        started = None
        if settings.warm_up:
            started = asyncio.get_running_loop().run_in_executor(executor, app.state.warm_up.run)
            started.add_done_callback(lambda future: _report(app, future))
        else:
            app.state.warm_up.done = True
        try:
            yield
        finally:
            if started is not None:
                await asyncio.wait([started])


def _report(app: Litestar, started: "asyncio.Future[None]") -> None:
    if not started.cancelled() and (error := started.exception()) is not None:
        app.state.log.failure("start", error)
