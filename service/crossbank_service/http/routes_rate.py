"""Rating one bank in one state."""

from typing import Any

import msgspec
from litestar import Request, Response, post

from crossbank.contract import RateRequest, RateResult
from crossbank_service import rating
from crossbank_service.errors import CoreError
from crossbank_service.http.calls import calculation


@post(
    "/v1/rate",
    status_code=200,
    operation_id="rate",
    opt={"takes": RateRequest, "gives": RateResult, "examples": True, "tag": "Calculations"},
)
async def rate(request: Request[Any, Any, Any]) -> Response[bytes]:
    """Rate a bank.

    The performance of one tube bank in one state: duty, outlet states, pressure drops, coefficients and wall
    temperatures, row by row, with the method, source and range behind every number. Numbers of the bank and
    the streams that the request leaves open are listed under `assumed`; what a reader should know stands
    under `notices`.
    """
    return await calculation(request, "rate", RateRequest, _rate_one)


def _rate_one(asked: RateRequest) -> msgspec.Struct | CoreError:
    return rating.rate([asked])[0]


ROUTES = (rate,)
