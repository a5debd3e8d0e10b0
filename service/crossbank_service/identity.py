"""Who computes: the versions that stand on every answer."""

from functools import cache
from importlib.metadata import version

from crossbank._version import __version__
from crossbank.contract import CONTRACT

SERVICE_VERSION = __version__

NUMBERS = "1"
"""Changes only when some result may move; each change stands under ``Numbers`` in the changelog."""


@cache
def properties_version() -> str:
    """Where fluid properties come from, with its version."""
    return f"CoolProp {version('coolprop')}"


__all__ = ["CONTRACT", "NUMBERS", "SERVICE_VERSION", "properties_version"]
