"""Several callers at once: the service goes on answering, and no caller feels another."""

import asyncio
import copy
import statistics
import time
from collections.abc import Callable
from concurrent.futures import ThreadPoolExecutor
from typing import Any

import httpx
import pytest

from crossbank._asgi import AsyncAppTransport
from crossbank_service import rating
from crossbank_service.errors import Impossible
from crossbank_service.http import Settings, create_app
from crossbank_service.http.examples import examples

Body = dict[str, Any]


def heavy() -> Body:
    """Give a body that takes long: many rows and segments, every method compared."""
    body: Body = copy.deepcopy(examples()["press-section-heat-recovery"])
    body["bank"]["layout"]["rows"] = 60
    body["bank"]["circuit"] = {"passes": 60}
    body["detail"] = {"segments": 40, "compare_methods": True}
    return body


def test_health_answers_while_a_heavy_calculation_runs() -> None:
    """Liveness takes under 100 ms in the middle of a calculation that takes many times that."""

    async def watch() -> tuple[float, list[float], httpx.Response]:
        app = create_app(Settings())
        async with httpx.AsyncClient(
            transport=AsyncAppTransport(app), base_url="http://service", timeout=300
        ) as client:
            while (await client.get("/health/ready")).status_code != 200:  # noqa: ASYNC110  no event here
                await asyncio.sleep(0.05)
            start = time.perf_counter()
            calculation = asyncio.create_task(client.post("/v1/rate", json=heavy()))
            waits = []
            while not calculation.done():
                asked = time.perf_counter()
                assert (await client.get("/health/live")).status_code == 200
                waits.append(time.perf_counter() - asked)
                await asyncio.sleep(0.01)
            return time.perf_counter() - start, waits, await calculation

    duration, waits, answer = asyncio.run(watch())
    assert answer.status_code == 200, answer.text
    assert duration > 0.3
    assert len(waits) > 5
    assert statistics.median(waits) < 0.1


def test_parallel_equals_serial(service: httpx.Client) -> None:
    """Eleven different cases at once give, bit for bit, what they give one after the other."""
    bodies = []
    for shift, body in zip(range(11), list(examples().values()) * 4, strict=False):
        changed = copy.deepcopy(body)
        changed["outside"]["inlet_temperature_k"] += shift / 3
        bodies.append(changed)

    def rate(body: Body) -> bytes:
        answer = service.post("/v1/rate", json=body)
        assert answer.status_code == 200, answer.text
        return answer.content

    serial = [rate(body) for body in bodies]
    with ThreadPoolExecutor(len(bodies)) as threads:
        parallel = list(threads.map(rate, bodies))
    assert parallel == serial


def test_ready_only_after_the_first_rating(
    logged: Callable[[Settings], Any], monkeypatch: pytest.MonkeyPatch
) -> None:
    """Until then 503 with Retry-After, alive all the while; a failed start is never ready."""
    with monkeypatch.context() as patch:
        patch.setattr(rating, "rate", lambda requests: [Impossible("no start today") for _ in requests])
        service = logged(Settings())
        for _ in range(100):
            answer = service.client.get("/health/ready")
            if "failed" in answer.json()["detail"]:
                break
            time.sleep(0.05)
    assert answer.status_code == 503
    assert answer.headers["retry-after"]
    assert answer.json()["code"] == "overloaded"
    assert service.client.get("/health/live").status_code == 200
    assert "no start today" in service.lines("start")[0]["exception"]

    sound = logged(Settings()).client
    until = time.monotonic() + 60
    while sound.get("/health/ready").status_code != 200:
        assert time.monotonic() < until
        time.sleep(0.05)
