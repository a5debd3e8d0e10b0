"""Count ratings a second over HTTP, beside an endpoint that does nothing, on this machine's loopback.

    python tests/benchmarks/over_http.py [--requests 200] [--connections 4] [--workers 1]

Both servers run in a process of their own behind the same HTTP server: the service as it ships, and an application
that reads the body and answers with fixed bytes as long as a result. The difference is what the rating, the checks
and the record cost.
"""

import argparse
import asyncio
import json
import os
import statistics
import subprocess
import sys
import time
from collections.abc import Awaitable, Callable, Iterator, Sequence
from contextlib import contextmanager
from pathlib import Path
from typing import Any

import httpx

from crossbank_service.demo import HOST, free_port, running_service

EXAMPLES = Path(__file__).parents[2] / "client" / "crossbank" / "examples"
BARE_ANSWER = b'{"filling": "' + b"x" * 8000 + b'"}'
STARTING_SECONDS = 20.0
Message = dict[str, Any]


async def bare(
    scope: Message, receive: Callable[[], Awaitable[Message]], send: Callable[[Message], Awaitable[None]]
) -> None:
    """Answer every request with the same bytes."""
    if scope["type"] != "http":
        return
    while (await receive()).get("more_body"):
        pass
    await send(
        {"type": "http.response.start", "status": 200, "headers": [(b"content-type", b"application/json")]}
    )
    await send({"type": "http.response.body", "body": BARE_ANSWER})


@contextmanager
def running_bare(port: int, workers: int) -> Iterator[str]:
    """Run the bare application and give its address."""
    command = [sys.executable, "-m", "granian", "--interface", "asgi", "--host", HOST, "--port", str(port)]
    command += ["--workers", str(workers), "--no-access-log", "--no-log", "over_http:bare"]
    environment = os.environ | {"PYTHONPATH": os.pathsep.join([str(Path(__file__).parent), *sys.path])}
    process = subprocess.Popen(command, env=environment)
    try:
        url = f"http://{HOST}:{port}"
        until = time.monotonic() + STARTING_SECONDS
        while True:
            try:
                httpx.get(url, timeout=1.0)
                break
            except httpx.TransportError:
                if process.poll() is not None or time.monotonic() > until:
                    raise
                time.sleep(0.05)
        yield url
    finally:
        process.terminate()
        process.wait(timeout=10)


async def load(url: str, bodies: Sequence[bytes], connections: int) -> tuple[float, list[float], int]:
    """Send every body once over some connections; returns seconds, each answer's time, and bytes answered."""
    waiting = list(reversed(bodies))
    times: list[float] = []
    size = 0

    async def connection(client: httpx.AsyncClient) -> None:
        nonlocal size
        while waiting:
            body = waiting.pop()
            start = time.perf_counter()
            answer = await client.post(url, content=body, headers={"content-type": "application/json"})
            answer.raise_for_status()
            times.append(time.perf_counter() - start)
            size += len(answer.content)

    async with httpx.AsyncClient(timeout=60.0) as client:
        start = time.perf_counter()
        await asyncio.gather(*(connection(client) for _ in range(connections)))
        return time.perf_counter() - start, times, size


def measure(name: str, url: str, bodies: Sequence[bytes], connections: int) -> float:
    """Warm up, load, print a line; returns answers a second."""
    asyncio.run(load(url, bodies[: max(4, len(bodies) // 10)], connections))
    seconds, times, size = asyncio.run(load(url, bodies, connections))
    times.sort()
    rate = len(bodies) / seconds
    late = times[min(len(times) - 1, int(0.95 * len(times)))]
    sys.stdout.write(
        f"  {name:<28}{rate:9.1f} answers/s   median {statistics.median(times) * 1e3:7.2f} ms"
        f"   95 % within {late * 1e3:7.2f} ms   {size / len(bodies) / 1e3:5.1f} kB each\n"
    )
    sys.stdout.flush()
    return rate


def bodies_of(name: str, count: int) -> list[bytes]:
    """Requests of an example that differ in their air flow."""
    body = json.loads((EXAMPLES / f"{name}.json").read_text(encoding="utf-8"))
    out = []
    for i in range(count):
        flow = {
            key: value * (0.8 + 0.4 * i / count)
            for key, value in body["outside"]["flow"].items()
            if key != "kind"
        }
        outside = body["outside"] | {"flow": body["outside"]["flow"] | flow}
        out.append(json.dumps(body | {"outside": outside}).encode())
    return out


def main(arguments: Sequence[str] | None = None) -> int:
    """Run both servers in turn and print what was measured."""
    parser = argparse.ArgumentParser(
        description="Counts ratings a second over HTTP on this machine's loopback."
    )
    parser.add_argument("--requests", type=int, default=200, help="requests of each kind")
    parser.add_argument("--connections", type=int, default=4, help="requests in the air at once")
    parser.add_argument("--workers", type=int, default=1, help="processes of the server")
    given = parser.parse_args(arguments)
    examples = {
        name: bodies_of(name, given.requests)
        for name in ("veneer-dryer-heater", "press-section-heat-recovery")
    }
    first = next(iter(examples.values()))
    with running_bare(free_port(), given.workers) as url:
        nothing = measure("bare endpoint", url, first, given.connections)
    environment = {key: value for key, value in os.environ.items() if not key.startswith("CROSSBANK_")}
    environment["PYTHONPATH"] = os.pathsep.join(path for path in sys.path if path)
    with running_service(free_port(), environment, workers=given.workers) as url:
        for name, bodies in examples.items():
            rate = measure(name, f"{url}/v1/rate", bodies, given.connections)
            sys.stdout.write(f"    bare / rating {nothing / rate:.1f}\n")
    return 0


if __name__ == "__main__":
    sys.exit(main())
