"""The example bodies that come with the client."""

from functools import cache
from importlib import resources
from typing import Any

import msgspec


@cache
def examples() -> dict[str, Any]:
    """Give the example bodies of a rating by name, in the order of the names."""
    folder = resources.files("crossbank") / "examples"
    files = sorted((f for f in folder.iterdir() if f.name.endswith(".json")), key=lambda f: f.name)
    return {f.name.removesuffix(".json"): msgspec.json.decode(f.read_bytes()) for f in files}
