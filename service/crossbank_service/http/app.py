"""Puts the application together."""

from typing import Any

from litestar import Litestar
from litestar.datastructures import State
from litestar.exceptions import HTTPException

from crossbank_service.http import routes_catalogues, routes_house, routes_methods, routes_rate
from crossbank_service.http.keys import require_key
from crossbank_service.http.outer import OuterLayer
from crossbank_service.http.problems import on_error
from crossbank_service.http.settings import Settings
from crossbank_service.http.warm_up import WarmUp, workers
from crossbank_service.record import EventLog

_ROUTES = (*routes_rate.ROUTES, *routes_methods.ROUTES, *routes_catalogues.ROUTES, *routes_house.ROUTES)


def create_app(settings: Settings | None = None, *, log: EventLog | None = None) -> OuterLayer:
    """Make the service as an ASGI application.

    Parameters
    ----------
    settings : Settings, optional
        What an operator sets; by default read from the environment.
    log : EventLog, optional
        Takes the log in place of the destination in the settings.

    Returns
    -------
    OuterLayer
        An ASGI callable. Its ``application`` is the framework's object inside.
    """
    settings = Settings.from_environment() if settings is None else settings
    log = EventLog(settings.log) if log is None else log
    application = Litestar(
        route_handlers=list(_ROUTES),
        guards=[require_key],
        exception_handlers={HTTPException: on_error, Exception: on_error},
        request_max_body_size=settings.max_body_bytes,
        lifespan=[workers],
        openapi_config=None,
        logging_config=None,
        state=State({"settings": settings, "log": log, "warm_up": WarmUp()}),
    )
    return OuterLayer(application, log)


def served_app() -> Any:
    """Make the service as a server runs it: logging to standard output unless told otherwise."""
    return create_app(Settings.from_environment(log="stdout"))
