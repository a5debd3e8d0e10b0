"""Rating: what a bank does in a given state. One front door, ``rate``."""

from collections.abc import Sequence
from dataclasses import replace

import msgspec

from crossbank.contract import Comparison, Notice, RateRequest, RateResult, given
from crossbank_service.errors import CoreError, Fault, Impossible, NotConverged, OutOfRange
from crossbank_service.rating import _engine, _report, _uneven
from crossbank_service.rating._case import Case
from crossbank_service.rating._door import enter
from crossbank_service.rating._methods import other_methods
from crossbank_service.rating._performance import Performance
from crossbank_service.rating._ranges import MethodRange
from crossbank_service.rating._remarks import remarks
from crossbank_service.rating._report import one
from crossbank_service.rating._still import still_inside
from crossbank_service.rating.notices import NOTICES, NoticeKind

HEAT_BALANCE_TOLERANCE = 1e-6
DUTY_CHANGE_TOLERANCE = 1e-8

__all__ = ["NOTICES", "NoticeKind", "rate"]


def rate(requests: Sequence[RateRequest]) -> list[RateResult | CoreError]:
    """Rate banks, one answer a request, in order.

    Parameters
    ----------
    requests : sequence of RateRequest
        Any mixture; requests of one shape are computed in one array.

    Returns
    -------
    list of RateResult or CoreError
        A request that cannot be rated has the error in its place; it never spoils the others.
    """
    entered = [enter(request) for request in requests]
    cases = [case for case in entered if isinstance(case, Case)]
    answers = iter(_answers(cases))
    return [next(answers) if isinstance(case, Case) else case for case in entered]


def _answers(cases: list[Case]) -> list[RateResult | CoreError]:
    rated = _uneven.perform([_engine.adiabatic(case) if _without_heat(case) else case for case in cases])
    out: list[RateResult | CoreError] = []
    for case, ((performance, used), unevenness) in zip(cases, rated, strict=True):
        if _without_heat(case) and case.inside.kind != "held-surface":
            performance = replace(performance, inside=still_inside(case))  # noqa: PLW2901
        fault = _refusal(case, performance, used)
        if fault is not None:
            out.append(fault)
            continue
        notices: list[Notice] = remarks(case, performance, used, unevenness)
        out.append(_report.result(case, performance, used, notices))
    return _with_comparisons(cases, out)


def _without_heat(case: Case) -> bool:
    """Cases whose heat balance is left out: it would divide by a flow of nothing, or run the wrong way."""
    if case.idle == "no-difference":
        return case.inside.kind == "condensing"
    return case.idle is not None


def _refusal(case: Case, found: Performance, used: tuple[MethodRange, ...]) -> CoreError | None:
    change, residual = one(found.change), one(found.residual)
    if one(found.outside.choked) and case.outside_flow:
        drop = one(found.outside.friction_drop) + one(found.outside.momentum_drop)
        return _choked("/outside/flow", "outside stream", drop, case.outside_pressure)
    if found.inside is not None and one(found.inside.choked):
        pointer = "/inside/flow_kg_s" if case.inside.kind == "single-phase" else "/inside/inlet_pressure_pa"
        return _choked(pointer, "inside stream", one(found.inside.drop), case.inside.pressure)
    if not change <= DUTY_CHANGE_TOLERANCE or not (case.idle or residual <= HEAT_BALANCE_TOLERANCE):
        return NotConverged(
            f"The rating did not settle: after {one(found.iterations):.0f} renewals the duty still moved by "
            f"{change:.2e} of itself and the heat balance closed to {residual:.2e}."
        )
    if case.request.strict and not case.idle:
        beyond = [each for each in used if not each.within]
        if beyond:
            return OutOfRange(
                "A correlation would be used outside its published range.",
                [
                    Fault(
                        pointer=f"/methods/{each.method.role}", detail=each.note or "", given=each.method.slug
                    )
                    for each in beyond
                ],
            )
    return None


def _choked(pointer: str, what: str, drop: float, pressure: float) -> CoreError:
    detail = (
        f"The {what} would lose {drop:.4g} Pa of its {pressure:.4g} Pa: more than half of its pressure, which is no "
        "state these methods can rate. Less flow or more section is needed."
    )
    return Impossible(detail, [Fault(pointer=pointer, detail=detail)])


def _with_comparisons(
    cases: list[Case], answers: list[RateResult | CoreError]
) -> list[RateResult | CoreError]:
    """Add to the answers that ask for it the same rating by every other applicable method."""
    variants = [
        (i, role, slug, variant)
        for i, (case, answer) in enumerate(zip(cases, answers, strict=True))
        if not isinstance(answer, CoreError)
        and given(given(case.request.detail).compare_methods)
        and not case.idle
        for role, slug, variant in other_methods(case)
    ]
    rated = [found for found, _ in _uneven.perform([variant for *_, variant in variants])]
    lists: dict[int, list[Comparison]] = {}
    for (i, role, slug, _), (performance, used) in zip(variants, rated, strict=True):
        if not one(performance.change) <= DUTY_CHANGE_TOLERANCE:
            continue
        inside = performance.inside
        lists.setdefault(i, []).append(
            Comparison(
                role=role,
                method=slug,
                in_range=all(each.within for each in used if each.method.role == role),
                duty_w=one(performance.duty),
                outside_outlet_temperature_k=one(performance.outside.outlet_temperature),
                inside_outlet_temperature_k=None if inside is None else one(inside.outlet_temperature),
                outside_pressure_drop_pa=one(performance.outside.friction_drop)
                + one(performance.outside.momentum_drop),
                inside_pressure_drop_pa=None if inside is None else one(inside.drop),
            )
        )
    out = list(answers)
    for i, (case, answer) in enumerate(zip(cases, answers, strict=True)):
        if isinstance(answer, RateResult) and given(given(case.request.detail).compare_methods):
            out[i] = msgspec.structs.replace(answer, comparisons=lists.get(i, []))
    return out
