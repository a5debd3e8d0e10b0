"""What belongs into the line of a calculation: enough to find it, to read it and to repeat it."""

from typing import Any

import msgspec

from crossbank.contract import Problem, RateResult, canonical, input_sha256


def calculation_entry(
    call: str,
    request: msgspec.Struct | None,
    answer: msgspec.Struct | None,
    problem: Problem | None,
    *,
    with_input: bool,
) -> dict[str, Any]:
    """Gather the members of a calculation's line.

    Parameters
    ----------
    call : str
        Name of the call, such as ``rate``.
    request : Struct or None
        The decoded request; None where the body broke the contract.
    answer : Struct or None
        The answer; None where the calculation was refused.
    problem : Problem or None
        The refusal, if it was one.
    with_input : bool
        Whether the canonical input is written down too.
    """
    entry: dict[str, Any] = {"call": call, "status": 200 if problem is None else problem.status}
    if problem is not None:
        entry["code"] = problem.code
        entry["pointers"] = [fault.pointer for fault in problem.errors]
    if request is not None:
        entry["input_sha256"] = input_sha256(call, request)
        reference = getattr(request, "reference", None)
        if reference is not None:
            entry["reference"] = msgspec.to_builtins(reference)
        if with_input:
            entry["input"] = canonical(call, request)["request"]
    if isinstance(answer, RateResult):
        entry |= _headline(answer)
    return entry


def _headline(answer: RateResult) -> dict[str, Any]:
    return {
        "duty_w": answer.duty_w,
        "outside_outlet_temperature_k": answer.outside.outlet_temperature_k,
        "outside_pressure_drop_pa": answer.outside.pressure_drop_pa,
        "inside_outlet_temperature_k": answer.inside.outlet_temperature_k,
        "inside_pressure_drop_pa": answer.inside.pressure_drop_pa,
        "methods": [used.method for used in answer.methods],
        "notices": [notice.code for notice in answer.notices],
        "iterations": answer.iterations,
        "service_version": answer.record.service_version,
        "numbers": answer.record.numbers,
    }
