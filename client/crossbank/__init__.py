"""The crossbank client: the wire contract, a typed client and a command line."""

from crossbank import calls, contract, errors
from crossbank._local import alocal, local
from crossbank._version import __version__
from crossbank.calls import Answer
from crossbank.client import AsyncClient, Client
from crossbank.contract import RateRequest, RateResult
from crossbank.errors import ApiError, CrossbankError

__all__ = [
    "Answer",
    "ApiError",
    "AsyncClient",
    "Client",
    "CrossbankError",
    "RateRequest",
    "RateResult",
    "__version__",
    "alocal",
    "calls",
    "contract",
    "errors",
    "local",
]
