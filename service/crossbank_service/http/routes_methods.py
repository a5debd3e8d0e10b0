"""The correlations: listed with their sources and ranges, and evaluated one at a time."""

from functools import cache
from typing import Any

import msgspec
from litestar import Request, Response, get, post, route
from litestar.params import FromPath

from crossbank.contract import Evaluation, MethodInput, MethodLimit, MethodRecord, MethodRecords
from crossbank_service.errors import CoreError
from crossbank_service.http.calls import answer_response, calculation
from crossbank_service.http.media import negotiate, write
from crossbank_service.http.method_inputs import all_inputs, evaluate, inputs_of, truth
from crossbank_service.http.problems import Refusal
from crossbank_service.methods import METHODS
from crossbank_service.methods.nomenclature import NOMENCLATURE
from crossbank_service.methods.record import Method

_SLUG = {"name": "slug", "description": "Slug of a method.", "words": tuple(METHODS)}
_ROLE = {
    "name": "role",
    "description": "Which of a slug's methods, where it has one for heat transfer and one for pressure drop.",
    "words": tuple(dict.fromkeys(method.role for records in METHODS.values() for method in records)),
}


@get("/v1/methods", operation_id="methods", opt={"gives": MethodRecords, "tag": "Methods"})
async def methods(request: Request[Any, Any, Any]) -> Response[bytes]:
    """List the methods.

    Every published correlation of this service: what it gives, from which inputs, its source, range, scatter
    and what is doubtful about it.
    """
    return _answer(
        request, MethodRecords(methods=[_record(m) for records in METHODS.values() for m in records])
    )


@get(
    "/v1/methods/{slug:str}",
    operation_id="method",
    opt={"gives": MethodRecords, "tag": "Methods", "path": [_SLUG], "errors": ("404",)},
)
async def method(request: Request[Any, Any, Any], slug: FromPath[str]) -> Response[bytes]:
    """Describe one method.

    A list, because one slug may serve heat transfer and pressure drop.
    """
    return _answer(request, MethodRecords(methods=[_record(m) for m in _methods_of(slug)]))


@post(
    "/v1/methods/{slug:str}",
    status_code=200,
    operation_id="evaluate",
    opt={
        "takes": all_inputs(),
        "gives": Evaluation,
        "tag": "Methods",
        "path": [_SLUG],
        "query": [_ROLE],
        "errors": ("404",),
    },
)
async def evaluate_method(request: Request[Any, Any, Any], slug: FromPath[str]) -> Response[bytes]:
    """Evaluate one method alone.

    On numbers, or on lists of equal lengths; a number beside lists stands for every point. Outside its
    range a method still answers, with `in_range` false and a note that names quantity, value and limits.
    """
    records = _methods_of(slug)
    role = request.query_params.get("role")
    chosen = next((m for m in records if role in {None, m.role}), None)
    if chosen is None:
        roles = " or ".join(m.role for m in records)
        raise Refusal("invalid-input", f"{slug} serves no such role; write role={roles}, or leave it out.")

    def calculate(asked: msgspec.Struct) -> msgspec.Struct | CoreError:
        return evaluate(chosen, asked)

    return await calculation(request, slug, inputs_of(chosen), calculate)


@route("/v1/methods/{slug:str}", http_method=["OPTIONS"], opt={"public": True})
async def options(request: Request[Any, Any, Any], slug: FromPath[str]) -> Response[None]:
    """List what the path answers; of a path with two handlers the framework's own list knows only one."""
    del slug
    scope: Any = request.scope
    here = next(r for r in request.app.routes if getattr(r, "path_format", "") == scope["path_template"])
    return Response(None, status_code=204, headers={"allow": ", ".join(sorted(here.methods))})


# the list for OPTIONS before the others, or the framework writes its own
ROUTES = (options, methods, method, evaluate_method)


def _methods_of(slug: str) -> tuple[Method, ...]:
    if slug not in METHODS:
        raise Refusal("not-found", "There is no method of this slug; GET /v1/methods lists what there is.")
    return METHODS[slug]


def _answer(request: Request[Any, Any, Any], answer: MethodRecords) -> Response[bytes]:
    media = negotiate(request.headers.get("accept", ""))
    return answer_response(write(answer, media), media)


@cache
def _record(method: Method) -> MethodRecord:
    return MethodRecord(
        slug=method.slug,
        role=method.role,
        surfaces=list(method.surfaces),
        arrangements=list(method.arrangements),
        gives=method.gives,
        inputs=[
            *(_input(name, required=True) for name in method.inputs),
            *(_input(name, required=False) for name in method.options),
        ],
        range=[
            *(_limit(limit.quantity, limit) for limit in method.limits),
            *(_limit(limit.name, limit) for limit in method.derived_limits),
        ],
        source=method.source,
        doubt=method.doubt,
        note=method.note,
        scatter_fraction=method.scatter_fraction,
        standard_uncertainty_fraction=method.standard_uncertainty_fraction,
        properties_at=method.properties_at,
    )


def _input(name: str, *, required: bool) -> MethodInput:
    quantity = NOMENCLATURE[name]
    number = not quantity.words and not truth(quantity)
    return MethodInput(
        name=name,
        symbol=quantity.symbol,
        unit=quantity.unit,
        meaning=quantity.meaning,
        required=required,
        at_least=quantity.at_least if number else None,
        at_most=quantity.at_most if number else None,
        one_of=list(quantity.words) or None,
    )


def _limit(name: str, limit: Any) -> MethodLimit:
    quantity = f"{name} ({limit.arrangement})" if limit.arrangement else name
    return MethodLimit(quantity=quantity, at_least=limit.at_least, at_most=limit.at_most)
