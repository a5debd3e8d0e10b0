"""What can be asked for and said: the service itself, fluids, materials, notices."""

from collections.abc import Callable
from functools import cache
from typing import Any

import msgspec
from litestar import Request, Response, get

from crossbank.contract import (
    CONTRACT,
    FluidRecords,
    MaterialRecords,
    NoticeRecord,
    NoticeRecords,
    ServiceInfo,
    ServiceLimits,
)
from crossbank_service import identity, rating
from crossbank_service.http.calls import answer_response
from crossbank_service.http.catalogue_records import fluid_record, fuel_record, gas_record, material_record
from crossbank_service.http.media import negotiate, write
from crossbank_service.properties import (
    fluid_records,
    fuel_records,
    gas_records,
    material_records,
    mixture_records,
)


@get("/v1", operation_id="service", opt={"gives": ServiceInfo, "tag": "Service"})
async def service(request: Request[Any, Any, Any]) -> Response[bytes]:
    """Say what this service is.

    Contract, version, and the limits set for this service. `numbers` changes only when some result may move.
    """
    settings = request.app.state.settings
    info = ServiceInfo(
        contract=CONTRACT,
        service_version=identity.SERVICE_VERSION,
        numbers=identity.NUMBERS,
        properties=identity.properties_version(),
        limits=ServiceLimits(body_bytes=settings.max_body_bytes),
    )
    media = negotiate(request.headers.get("accept", ""))
    return answer_response(write(info, media), media)


@get("/v1/fluids", operation_id="fluids", opt={"gives": FluidRecords, "tag": "Catalogues"})
async def fluids(request: Request[Any, Any, Any]) -> Response[bytes]:
    """List the fluids.

    Names, aliases, limits, sources, and how well each is known; the gases that mixtures may hold; typical fuels.
    """
    return _answer(request, _fluids)


@get("/v1/materials", operation_id="materials", opt={"gives": MaterialRecords, "tag": "Catalogues"})
async def materials(request: Request[Any, Any, Any]) -> Response[bytes]:
    """List the materials.

    Conductivity, elastic modulus and expansion by temperature, density, sources and doubts.
    """
    return _answer(request, _materials)


@get("/v1/notices", operation_id="notices", opt={"gives": NoticeRecords, "tag": "Catalogues"})
async def notices(request: Request[Any, Any, Any]) -> Response[bytes]:
    """List the notices a result can carry.

    Code, severity and meaning.
    """
    return _answer(request, _notices)


ROUTES = (service, fluids, materials, notices)


def _answer(request: Request[Any, Any, Any], build: Callable[[], msgspec.Struct]) -> Response[bytes]:
    media = negotiate(request.headers.get("accept", ""))
    return answer_response(_encoded(build, media), media)


@cache
def _encoded(build: Callable[[], msgspec.Struct], media: str) -> bytes:
    return write(build(), media)


def _fluids() -> FluidRecords:
    return FluidRecords(
        fluids=[fluid_record(entry) for entry in (*fluid_records(), *mixture_records())],
        gases=[gas_record(entry) for entry in gas_records()],
        fuels=[fuel_record(entry) for entry in fuel_records()],
    )


def _materials() -> MaterialRecords:
    return MaterialRecords(materials=[material_record(entry) for entry in material_records()])


def _notices() -> NoticeRecords:
    return NoticeRecords(
        notices=[
            NoticeRecord(code=notice.code, severity=notice.severity, meaning=notice.meaning)
            for notice in rating.NOTICES.values()
        ]
    )
