"""The service in the caller's own process, behind the same client."""

import importlib
from typing import cast

from crossbank._asgi import App, AppTransport, AsyncAppTransport
from crossbank.client import AsyncClient, Client

HERE = "http://crossbank.local"


def _app() -> App:
    try:
        module = importlib.import_module("crossbank_service.http")
    except ModuleNotFoundError as missing:
        raise ImportError(
            f"The service is not installed here ({missing.name} is missing): pip install 'crossbank[service]'"
        ) from missing
    return cast("App", module.create_app())


def local(*, media: str = "json") -> Client:
    """Return a client whose service runs in this process: no server, no network, the same answers.

    Parameters
    ----------
    media : str
        Form on the wire: ``json`` or ``msgpack``.

    Returns
    -------
    Client
        Close it, or use it as a context manager, to shut the service down. A calculation that has begun is
        not cut off by the timeout.
    """
    return Client(HERE, media=media, retries=0, transport=AppTransport(_app()))


def alocal(*, media: str = "json") -> AsyncClient:
    """Return an async client whose service runs in this event loop; use it as an async context manager."""
    return AsyncClient(HERE, media=media, retries=0, transport=AsyncAppTransport(_app()))
