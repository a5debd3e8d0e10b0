"""The typed clients: thin drivers of one shared exchange, see ``calls`` for what can be asked."""

import time
from types import TracebackType
from typing import Any, Self, TypeVar

import anyio
import httpx

from crossbank import calls
from crossbank._exchange import MEDIA, MOST_RETRIES, Broken, Late, Outcome, Reply, Send, Step, Wait, exchange
from crossbank._version import __version__
from crossbank.calls import Answer, Call, MethodValue, Plain
from crossbank.contract import (
    Bank,
    Condensing,
    Detail,
    Evaluation,
    FluidRecord,
    FuelRecord,
    HeldSurface,
    MaterialRecord,
    MethodChoice,
    MethodRecord,
    NoticeRecord,
    Outside,
    RateRequest,
    RateResult,
    Reference,
    ServiceInfo,
    SinglePhase,
)
from crossbank.errors import Overloaded

T = TypeVar("T")

BASE_URL = "http://127.0.0.1:8000"


class _Settings:
    """What both clients are told at construction."""

    def __init__(self, *, api_key: str | None, timeout: float, retries: int, media: str) -> None:
        if media not in MEDIA:
            raise ValueError(f"media is {media!r}; it is one of {', '.join(MEDIA)}.")
        if not 0 <= retries <= MOST_RETRIES:
            raise ValueError(f"retries is {retries}; it is from 0 to {MOST_RETRIES}.")
        if not timeout > 0:
            raise ValueError(f"timeout is {timeout}; it is a positive number of seconds.")
        self.media, self.retries, self.timeout = media, retries, timeout
        self.headers = {"user-agent": f"crossbank/{__version__}"}
        if api_key is not None:
            self.headers["x-api-key"] = api_key


def _url(base_url: str) -> httpx.URL:
    try:
        return httpx.URL(base_url)
    except httpx.InvalidURL as fault:
        raise ValueError(f"base_url is {base_url!r}: {fault}") from fault


def _reply(response: httpx.Response) -> Reply:
    return Reply(response.status_code, {k.lower(): v for k, v in response.headers.items()}, response.content)


def _failed(fault: httpx.HTTPError) -> Outcome:
    why = str(fault) or type(fault).__name__
    # a connection that never opened was not the service's thinking time: it may be tried again
    if isinstance(fault, httpx.TimeoutException) and not isinstance(fault, httpx.ConnectTimeout):
        return Late(why)
    return Broken(why)


class Client:
    """A connection pool to one crossbank service.

    Parameters
    ----------
    base_url : str
        Where the service answers.
    api_key : str or None
        Sent as ``X-API-Key``.
    timeout : float
        Seconds to wait for the connection, and for each part of the answer.
    retries : int
        How often a busy service (429, 503) or a broken connection is tried again, 0 to 10. Waits double, are
        spread at random and honour ``Retry-After``.
    media : str
        Form on the wire: ``json`` or ``msgpack``.
    transport : object or None
        Seam for tests and for the in-process service: an httpx transport.

    Notes
    -----
    Use it as a context manager, or call :meth:`close`. It may be shared between threads.
    """

    def __init__(
        self,
        base_url: str = BASE_URL,
        *,
        api_key: str | None = None,
        timeout: float = 60.0,
        retries: int = 2,
        media: str = "json",
        transport: Any = None,
    ) -> None:
        self._settings = _Settings(api_key=api_key, timeout=timeout, retries=retries, media=media)
        self._http = httpx.Client(
            base_url=_url(base_url), timeout=timeout, headers=self._settings.headers, transport=transport
        )

    def __enter__(self) -> Self:
        self._http.__enter__()
        return self

    def __exit__(
        self, kind: type[BaseException] | None, fault: BaseException | None, trace: TracebackType | None
    ) -> None:
        self._http.__exit__(kind, fault, trace)

    def close(self) -> None:
        """Close the connections."""
        self._http.close()

    def send(self, call: Call[T]) -> Answer[T]:
        """Carry out a call and return the whole answer, with the request's id and the bytes as they came."""
        talk = exchange(call, media=self._settings.media, retries=self._settings.retries)
        outcome: Outcome = None
        while True:
            try:
                step = talk.send(outcome)
            except StopIteration as done:
                answer: Answer[T] = done.value
                return answer
            outcome = self._do(step)

    def _do(self, step: Step) -> Outcome:
        if isinstance(step, Wait):
            time.sleep(step.seconds)
            return None
        try:
            return _reply(self._http.request(*_where(step), content=step.content, headers=dict(step.headers)))
        except httpx.HTTPError as fault:
            return _failed(fault)

    def rate(
        self,
        *,
        bank: Bank | Plain,
        outside: Outside | Plain,
        inside: HeldSurface | Condensing | SinglePhase | Plain,
        methods: MethodChoice | Plain | None = None,
        detail: Detail | Plain | None = None,
        label: str | None = None,
        reference: Reference | Plain | None = None,
        strict: bool | None = None,
    ) -> RateResult:
        """Rate one bank in one state; structs or plain dicts."""
        return self.send(
            calls.rate(
                bank=bank,
                outside=outside,
                inside=inside,
                methods=methods,
                detail=detail,
                label=label,
                reference=reference,
                strict=strict,
            )
        ).value

    def rate_request(self, request: RateRequest | Plain) -> RateResult:
        """Rate one bank in one state, given as one body."""
        return self.send(calls.rate_request(request)).value

    def methods(self) -> list[MethodRecord]:
        """List the correlations the service knows."""
        return self.send(calls.methods()).value.methods

    def method(self, slug: str) -> list[MethodRecord]:
        """Describe one correlation: a record for each role it has."""
        return self.send(calls.method(slug)).value.methods

    def evaluate(self, slug: str, **inputs: MethodValue) -> Evaluation:
        """Evaluate one correlation alone, on numbers or on lists of equal length."""
        return self.send(calls.evaluate(slug, inputs)).value

    def fluids(self) -> list[FluidRecord]:
        """List the fluids the service knows."""
        return self.send(calls.fluids()).value.fluids

    def fuels(self) -> list[FuelRecord]:
        """List typical fuels for `combustion-gas`."""
        return self.send(calls.fluids()).value.fuels

    def materials(self) -> list[MaterialRecord]:
        """List the materials the service knows."""
        return self.send(calls.materials()).value.materials

    def notices(self) -> list[NoticeRecord]:
        """List everything a result can draw attention to."""
        return self.send(calls.notices()).value.notices

    def service(self) -> ServiceInfo:
        """Tell versions and limits of the service."""
        return self.send(calls.service()).value

    def health(self) -> bool:
        """Tell whether the service takes work now."""
        try:
            self.send(calls.health())
        except Overloaded:
            return False
        return True


class AsyncClient:
    """The same as :class:`Client`, to be awaited; see there for the parameters."""

    def __init__(
        self,
        base_url: str = BASE_URL,
        *,
        api_key: str | None = None,
        timeout: float = 60.0,
        retries: int = 2,
        media: str = "json",
        transport: Any = None,
    ) -> None:
        self._settings = _Settings(api_key=api_key, timeout=timeout, retries=retries, media=media)
        self._http = httpx.AsyncClient(
            base_url=_url(base_url), timeout=timeout, headers=self._settings.headers, transport=transport
        )

    async def __aenter__(self) -> Self:
        await self._http.__aenter__()
        return self

    async def __aexit__(
        self, kind: type[BaseException] | None, fault: BaseException | None, trace: TracebackType | None
    ) -> None:
        await self._http.__aexit__(kind, fault, trace)

    async def aclose(self) -> None:
        """Close the connections."""
        await self._http.aclose()

    async def send(self, call: Call[T]) -> Answer[T]:
        """Carry out a call and return the whole answer, with the request's id and the bytes as they came."""
        talk = exchange(call, media=self._settings.media, retries=self._settings.retries)
        outcome: Outcome = None
        while True:
            try:
                step = talk.send(outcome)
            except StopIteration as done:
                answer: Answer[T] = done.value
                return answer
            outcome = await self._do(step)

    async def _do(self, step: Step) -> Outcome:
        if isinstance(step, Wait):
            await anyio.sleep(step.seconds)
            return None
        try:
            return _reply(
                await self._http.request(*_where(step), content=step.content, headers=dict(step.headers))
            )
        except httpx.HTTPError as fault:
            return _failed(fault)

    async def rate(
        self,
        *,
        bank: Bank | Plain,
        outside: Outside | Plain,
        inside: HeldSurface | Condensing | SinglePhase | Plain,
        methods: MethodChoice | Plain | None = None,
        detail: Detail | Plain | None = None,
        label: str | None = None,
        reference: Reference | Plain | None = None,
        strict: bool | None = None,
    ) -> RateResult:
        """Rate one bank in one state; structs or plain dicts."""
        call = calls.rate(
            bank=bank,
            outside=outside,
            inside=inside,
            methods=methods,
            detail=detail,
            label=label,
            reference=reference,
            strict=strict,
        )
        return (await self.send(call)).value

    async def rate_request(self, request: RateRequest | Plain) -> RateResult:
        """Rate one bank in one state, given as one body."""
        return (await self.send(calls.rate_request(request))).value

    async def methods(self) -> list[MethodRecord]:
        """List the correlations the service knows."""
        return (await self.send(calls.methods())).value.methods

    async def method(self, slug: str) -> list[MethodRecord]:
        """Describe one correlation: a record for each role it has."""
        return (await self.send(calls.method(slug))).value.methods

    async def evaluate(self, slug: str, **inputs: MethodValue) -> Evaluation:
        """Evaluate one correlation alone, on numbers or on lists of equal length."""
        return (await self.send(calls.evaluate(slug, inputs))).value

    async def fluids(self) -> list[FluidRecord]:
        """List the fluids the service knows."""
        return (await self.send(calls.fluids())).value.fluids

    async def fuels(self) -> list[FuelRecord]:
        """List typical fuels for `combustion-gas`."""
        return (await self.send(calls.fluids())).value.fuels

    async def materials(self) -> list[MaterialRecord]:
        """List the materials the service knows."""
        return (await self.send(calls.materials())).value.materials

    async def notices(self) -> list[NoticeRecord]:
        """List everything a result can draw attention to."""
        return (await self.send(calls.notices())).value.notices

    async def service(self) -> ServiceInfo:
        """Tell versions and limits of the service."""
        return (await self.send(calls.service())).value

    async def health(self) -> bool:
        """Tell whether the service takes work now."""
        try:
            await self.send(calls.health())
        except Overloaded:
            return False
        return True


def _where(step: Send) -> tuple[str, str]:
    return step.method, step.path
