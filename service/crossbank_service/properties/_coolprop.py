"""The one door to CoolProp: states are opened, used and dropped under a lock while a table is built."""

import threading
from collections.abc import Callable
from functools import wraps
from typing import Any, ParamSpec, TypeVar

P = ParamSpec("P")
T = TypeVar("T")

LOCK = threading.RLock()


def open_state(backend: str, name: str) -> Any:
    """Open a CoolProp low-level state, never to outlive the building of a table nor to leave its thread."""
    # imported here: the import takes seconds, and only the building of tables needs it
    from CoolProp.CoolProp import AbstractState  # noqa: PLC0415

    return AbstractState(backend, name)


def built_once(build: Callable[P, T]) -> Callable[P, T]:
    """Cache a table by its arguments, built by one thread at a time."""
    cache: dict[Any, T] = {}

    @wraps(build)
    def wrapper(*args: P.args, **kwargs: P.kwargs) -> T:
        key = (args, tuple(sorted(kwargs.items())))
        found = cache.get(key)
        if found is None:
            with LOCK:
                found = cache.get(key)
                if found is None:
                    found = cache[key] = build(*args, **kwargs)
        return found

    return wrapper
