"""The thin client stays thin, and leaves the process when its caller does."""

import subprocess
import sys
import textwrap

UNCLOSED = """
import sys, types
import crossbank

async def app(scope, receive, send):
    if scope["type"] == "lifespan":
        await receive()
        await send({"type": "lifespan.startup.complete"})
        await receive()
    else:
        await send({"type": "http.response.start", "status": 200, "headers": []})
        await send({"type": "http.response.body", "body": b""})

module = types.ModuleType("crossbank_service.http")
module.create_app = lambda: app
sys.modules["crossbank_service.http"] = module
client = crossbank.local()
assert client.health()
print("answered")
"""


def run(code: str) -> subprocess.CompletedProcess[str]:
    """Run a program of its own."""
    return subprocess.run(
        [sys.executable, "-c", textwrap.dedent(code)], capture_output=True, text=True, check=False, timeout=60
    )


def test_importing_the_client_loads_nothing_of_the_service() -> None:
    """The client, its command line included, needs httpx and msgspec only."""
    done = run(
        """
        import sys
        import crossbank.cli
        heavy = {"crossbank_service", "numpy", "scipy", "CoolProp", "litestar", "jinja2", "rfc8785"}
        print(sorted(heavy & set(sys.modules)))
        """
    )
    assert (done.stdout.strip(), done.returncode) == ("[]", 0), done.stderr


def test_a_local_client_never_closed_does_not_keep_the_process() -> None:
    """A caller who forgets to close it still gets the prompt back."""
    done = run(UNCLOSED)
    assert (done.stdout.strip(), done.returncode) == ("answered", 0), done.stderr
