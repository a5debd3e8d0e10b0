"""A caller's code as it should type-check under strict settings; lines marked wrong must be refused."""

from typing import assert_type

import crossbank
from crossbank import contract as cb
from crossbank.errors import InvalidInput


def bank() -> cb.Bank:
    """Build a bank from structs."""
    return cb.Bank(
        layout=cb.Layout(
            arrangement="staggered",
            transverse_pitch_m=0.05,
            longitudinal_pitch_m=0.045,
            rows=4,
            tubes_per_row=10,
            tube_length_m=2.0,
        ),
        tube=cb.Tube(outer_diameter_m=0.0254, wall_thickness_m=0.0021, material="carbon-steel"),
        circuit=cb.Circuit(passes=2),
    )


def rate_with_structs(client: crossbank.Client) -> float:
    """Rate with structs throughout."""
    result = client.rate(
        bank=bank(),
        outside=cb.Outside(
            fluid=cb.MoistAir(relative_humidity=0.8),
            flow=cb.Mass(kg_s=4.2),
            inlet_temperature_k=268.15,
            inlet_pressure_pa=101325.0,
        ),
        inside=cb.Condensing(fluid="water", inlet_pressure_pa=4e5),
        detail=cb.Detail(rows=False),
    )
    assert_type(result, crossbank.RateResult)
    assert_type(result.duty_w, float)
    assert_type(result.inside.outlet_temperature_k, float | None)
    return result.duty_w


def rate_with_dicts(client: crossbank.Client) -> str | None:
    """Rate with plain dicts, and keep the whole answer."""
    body = {"bank": {}, "outside": {}, "inside": {"kind": "held-surface", "temperature_k": 400}}
    assert_type(client.rate_request(body), crossbank.RateResult)
    assert_type(client.rate(bank={}, outside={}, inside={"kind": "held-surface"}), crossbank.RateResult)
    answer = client.send(crossbank.calls.rate_request(body))
    assert_type(answer, crossbank.Answer[crossbank.RateResult])
    return answer.request_id


async def rate_async(client: crossbank.AsyncClient) -> None:
    """Await the same calls."""
    assert_type(await client.rate(bank=bank(), outside={}, inside={}), crossbank.RateResult)
    assert_type(await client.methods(), list[cb.MethodRecord])
    assert_type(await client.health(), bool)


def read_errors(client: crossbank.Client) -> list[str]:
    """Catch a problem and read its pointers."""
    try:
        client.evaluate("zukauskas-1987", reynolds=[1e3, 1e4], prandtl=0.7, arrangement="inline")
    except InvalidInput as error:
        assert_type(error.errors, list[cb.FieldProblem])
        return [fault.pointer for fault in error.errors]
    return []


def narrow(request: crossbank.RateRequest) -> int:
    """Members with a default are narrowed by `given`."""
    return cb.given(cb.given(request.bank.circuit).passes)


def wrong(client: crossbank.Client) -> None:
    """Mistakes a type checker is to catch."""
    cb.Circuit(direction="along")  # type: ignore[arg-type]
    cb.Layout(rows=4)  # type: ignore[call-arg]
    cb.Mass(kg_h=4.0)  # type: ignore[call-arg]
    client.rate(bank=bank(), outside={})  # type: ignore[call-arg]
    client.rate(bank=bank(), outside={}, inside={}, solve={})  # type: ignore[call-arg]
    client.fluids().temperature  # type: ignore[attr-defined]  # noqa: B018
