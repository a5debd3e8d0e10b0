"""API keys, where the operator has set digests of them."""

import hashlib
import hmac
from typing import Any

from litestar.connection import ASGIConnection
from litestar.handlers import BaseRouteHandler

from crossbank_service.http.problems import Refusal

KEY_HEADER = "x-api-key"


def require_key(connection: ASGIConnection[Any, Any, Any, Any], handler: BaseRouteHandler) -> None:
    """Refuse a request without an accepted key; routes marked public are open to all.

    Raises
    ------
    Refusal
        ``unauthorized``.
    """
    digests: tuple[str, ...] = connection.app.state.settings.api_key_sha256
    if not digests or handler.opt.get("public"):
        return
    given = hashlib.sha256(connection.headers.get(KEY_HEADER, "").encode()).hexdigest()
    # every digest is compared, so that the time taken tells nothing
    if not sum(hmac.compare_digest(given, digest) for digest in digests):
        detail = "Send an accepted key in the header X-API-Key."
        raise Refusal("unauthorized", detail, headers={"www-authenticate": 'ApiKey realm="crossbank"'})
