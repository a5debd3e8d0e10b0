"""The service as an operator runs it: a process of its own, over HTTP."""

import os
from collections.abc import Iterator

import pytest

from crossbank_service.demo import free_port, running_service


@pytest.fixture(scope="session")
def url() -> Iterator[str]:
    """Give the address of a running service."""
    environment = {key: value for key, value in os.environ.items() if not key.startswith("CROSSBANK_")}
    with running_service(free_port(), environment) as address:
        yield address
