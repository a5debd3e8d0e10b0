"""Properties that hold for every request: an answer or a named refusal, a closed balance, no effect of company."""

import math
import random
from collections.abc import Iterator
from itertools import pairwise
from typing import Any

import msgspec
import pytest
from CoolProp.CoolProp import PropsSI
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st
from tests.unit.rating.bank_requests import (
    STEAM,
    WATER,
    Body,
    answer,
    any_requests,
    bank,
    body,
    mass,
    rated,
    request,
)

from crossbank.contract import RateResult
from crossbank_service.errors import CoreError
from crossbank_service.rating import rate

_REFUSALS = {"invalid-input", "impossible", "not-converged"}

# fixed seeds: the same requests on every run
fixed = settings(
    derandomize=True, deadline=None, suppress_health_check=[HealthCheck.too_slow, HealthCheck.data_too_large]
)


def _numbers(value: Any, place: str = "") -> Iterator[tuple[str, float]]:
    if isinstance(value, dict):
        for name, inner in value.items():
            yield from _numbers(inner, f"{place}/{name}")
    elif isinstance(value, list):
        for index, inner in enumerate(value):
            yield from _numbers(inner, f"{place}/{index}")
    elif isinstance(value, float):
        yield place, value


@settings(fixed, max_examples=200)
@given(any_requests())
def test_there_is_an_answer_or_a_named_refusal(parts: Body) -> None:
    """Every request that passes the schema is answered in finite numbers or refused by a known code."""
    found = answer(parts)
    if isinstance(found, CoreError):
        assert found.code in _REFUSALS
        assert found.detail
        assert found.faults or found.code == "not-converged"
        for fault in found.faults:
            assert fault.pointer.startswith("/")
        return
    builtins = msgspec.to_builtins(found)
    for place, value in _numbers(builtins):
        assert math.isfinite(value), place
    # the wire's own bounds
    assert msgspec.json.decode(msgspec.json.encode(found), type=RateResult) == found
    assert found.heat_balance_residual <= 1e-6
    low, high = sorted(
        (
            found.outside.inlet_temperature_k,
            found.inside.inlet_temperature_k or found.outside.inlet_temperature_k,
        )
    )
    if parts["inside"]["kind"] == "condensing":
        high = max(high, found.outside.inlet_temperature_k)
    assert low - 0.01 <= found.outside.outlet_temperature_k <= high + 0.01
    change = found.outside.outlet_temperature_k - found.outside.inlet_temperature_k
    assert found.duty_w * change >= -1e-6 * abs(found.duty_w)
    shares = found.overall.resistance_shares
    if shares is not None:
        values = msgspec.structs.astuple(shares)
        assert sum(values) == pytest.approx(1.0, abs=1e-9)
        assert min(values) >= 0.0
    if found.overall.effectiveness is not None:
        assert -1e-12 <= found.overall.effectiveness <= 1.0 + 1e-6


@settings(fixed, max_examples=15)
@given(st.lists(any_requests(), min_size=3, max_size=6), st.randoms(use_true_random=False))
def test_company_and_order_leave_no_trace(bodies: list[Body], shuffler: random.Random) -> None:
    """A case gives the same bytes alone, in a batch, and in the batch in any order, to the last bit."""
    decoded = [request(parts) for parts in bodies]
    # the same shape with other numbers, so that cases do share arrays
    decoded += [request(_slower(parts)) for parts in bodies]
    alone = [_bytes(rate([each])[0]) for each in decoded]
    assert [_bytes(each) for each in rate(decoded)] == alone
    order = list(range(len(decoded)))
    shuffler.shuffle(order)
    shuffled = rate([decoded[i] for i in order])
    assert [_bytes(each) for each in shuffled] == [alone[i] for i in order]


def _slower(parts: Body) -> Body:
    flow = parts["outside"]["flow"]
    member = next(name for name in flow if name in ("kg_s", "m3_s", "m_s"))
    return {**parts, "outside": {**parts["outside"], "flow": {**flow, member: 0.83 * flow[member]}}}


def _bytes(found: RateResult | CoreError) -> bytes:
    if isinstance(found, CoreError):
        return f"{found.code} {found.detail} {found.faults}".encode()
    return msgspec.json.encode(found)


def _easy(scale: float, tilt: float) -> list[Body]:
    """Cases of ordinary banks that share their arrays with each other."""
    return [
        body(bank(8, 4), {**WATER, "flow_kg_s": 2.0 * tilt}, {"flow": mass(3.0 * scale)}),
        body(
            bank(12),
            {**STEAM, "inlet_pressure_pa": 2e5 * tilt},
            {"flow": mass(3.0 * scale), "inlet_temperature_k": 290.0},
        ),
        body(
            bank(10, arrangement="inline"),
            {"kind": "held-surface", "temperature_k": 400.0 * tilt},
            {"flow": mass(3.0 * scale)},
        ),
        body(
            bank(8, 4),
            {**WATER, "flow_kg_s": 2.0 * tilt},
            {"flow": mass(3.0 * scale)},
            {"resolution": "bank"},
        ),
    ]


def test_large_batches_leave_no_trace() -> None:
    """Twelve hundred cases, in more arrays than one, agree bit for bit with each alone (every 97th is tried)."""
    bodies = [each for i in range(300) for each in _easy(0.3 + i / 150.0, 0.9 + i / 1500.0)]
    decoded = [request(parts) for parts in bodies]
    together = rate(decoded)
    assert not any(isinstance(each, CoreError) for each in together)
    for i in range(0, len(decoded), 97):
        assert _bytes(rate([decoded[i]])[0]) == _bytes(together[i])


def test_a_hard_case_does_not_disturb_the_easy_ones() -> None:
    """A neighbour that takes many renewals, or never settles, leaves no trace in the others."""
    easy = _easy(1.0, 1.0)
    hard = body(
        bank(12),
        {**STEAM, "inlet_pressure_pa": 2e3},
        {"flow": mass(3.0), "inlet_temperature_k": 290.0},
        methods={"inside_heat_transfer": "cavallini-2006"},
    )
    alone = [_bytes(answer(parts)) for parts in easy]
    together = rate([request(parts) for parts in (hard, *easy, hard)])
    assert [_bytes(each) for each in together[1:-1]] == alone


_BY_AN_EQUATION_OF_STATE: dict[str, tuple[str, float, Body]] = {
    "gas at one bar": (
        "Nitrogen",
        300.0,
        {"fluid": "nitrogen", "inlet_temperature_k": 420.0, "flow_kg_s": 0.4},
    ),
    "water in hot air": ("Water", 600.0, {"inlet_pressure_pa": 2e6, "flow_kg_s": 9.0}),
    "ammonia": (
        "Ammonia",
        330.0,
        {"fluid": "ammonia", "inlet_pressure_pa": 2e6, "flow_kg_s": 1.0, "inlet_temperature_k": 280.0},
    ),
    "carbon dioxide": (
        "CarbonDioxide",
        800.0,
        {"fluid": "carbon-dioxide", "inlet_temperature_k": 330.0, "inlet_pressure_pa": 1e6, "flow_kg_s": 2.0},
    ),
    "nitrogen that loses a tenth of 20 bar": (
        "Nitrogen",
        486.0,
        {"fluid": "nitrogen", "inlet_temperature_k": 250.0, "inlet_pressure_pa": 2e6, "flow_kg_s": 9.0},
    ),
}


@pytest.mark.parametrize("name", list(_BY_AN_EQUATION_OF_STATE))
def test_heat_balance_closes_by_an_equation_of_state(name: str) -> None:
    """Both streams' terminals, read with CoolProp at each stream's mean pressure, carry the stated duty."""
    equation, hot, members = _BY_AN_EQUATION_OF_STATE[name]
    inside = {**WATER, **members}
    found = rated(body(bank(8, 4), inside, {"fluid": "air", "inlet_temperature_k": hot}))

    def change(fluid: str, ends: tuple[float, float], pressures: tuple[float, float]) -> float:
        h = [PropsSI("H", "T", end, "P", 0.5 * sum(pressures), fluid) for end in ends]
        return float(h[1] - h[0])

    i, o = found.inside, found.outside
    assert i.outlet_temperature_k is not None
    assert i.outlet_pressure_pa is not None
    taken = inside["flow_kg_s"] * change(
        equation,
        (inside["inlet_temperature_k"], i.outlet_temperature_k),
        (inside["inlet_pressure_pa"], i.outlet_pressure_pa),
    )
    given = 3.0 * change("Air", (hot, o.outlet_temperature_k), (101325.0, o.outlet_pressure_pa))
    # property tables follow the equations of state within a few parts in 1e5
    assert taken == pytest.approx(-found.duty_w, rel=2e-4)
    assert given == pytest.approx(found.duty_w, rel=2e-4)


@pytest.mark.parametrize(
    "inside",
    [
        # warm ends far apart: the properties are no longer polynomials of one range
        {
            **WATER,
            "fluid": "n-hexane",
            "inlet_temperature_k": 390.0,
            "inlet_pressure_pa": 5e6,
            "flow_kg_s": 20.0,
        },
        {**WATER, "fluid": "nitrogen", "inlet_temperature_k": 420.0, "flow_kg_s": 0.4},
        {
            **WATER,
            "fluid": "nitrogen",
            "inlet_temperature_k": 420.0,
            "inlet_pressure_pa": 2e6,
            "flow_kg_s": 6.0,
        },
        {
            **WATER,
            "fluid": "water",
            "inlet_temperature_k": 400.0,
            "inlet_pressure_pa": 5e6,
            "flow_kg_s": 25.0,
        },
    ],
)
def test_ordinary_streams_settle(inside: Body) -> None:
    """Liquids and gases at ordinary pressures and drops are answered, with the balance closed."""
    found = rated(body(bank(8, 4), inside, {"fluid": "air", "inlet_temperature_k": 268.0}))
    assert found.heat_balance_residual <= 1e-6
    assert found.iterations < 60


_RISE = 1.0 - 1e-9


@pytest.mark.parametrize("inside", [STEAM, WATER, {"kind": "held-surface", "temperature_k": 420.0}])
@pytest.mark.parametrize("arrangement", ["inline", "staggered"])
def test_duty_rises_with_outside_flow(inside: Body, arrangement: str) -> None:
    """From a trickle to a gale through every passage between correlations."""
    flows = [0.003 * 1.25**i for i in range(44)]
    warm = {"inlet_temperature_k": 300.0 if inside is not WATER else 350.0}
    part = bank(6, arrangement=arrangement)
    answers = rate([request(body(part, inside, {**warm, "flow": mass(flow)})) for flow in flows])
    duties = [abs(each.duty_w) for each in answers if isinstance(each, RateResult)]
    assert len(duties) >= 40
    assert all(after > before * _RISE for before, after in pairwise(duties))


def test_duty_rises_with_inside_flow() -> None:
    """From laminar through transition to turbulent flow inside."""
    answers = rate([request(body(bank(4, 4), {**WATER, "flow_kg_s": 0.01 * 1.2**i})) for i in range(40)])
    duties = [-each.duty_w for each in answers if isinstance(each, RateResult)]
    assert len(duties) >= 38
    assert all(after > before * _RISE for before, after in pairwise(duties))


@pytest.mark.parametrize("inside", [STEAM, WATER, {"kind": "held-surface", "temperature_k": 420.0}])
def test_duty_rises_with_area(inside: Body) -> None:
    """More rows, longer tubes and, with one inside temperature, more tubes side by side transfer more."""
    start = 300.0 if inside is not WATER else 350.0

    def duties(parts: list[Body]) -> list[float]:
        answers = rate([request(body(part, inside, {"inlet_temperature_k": start})) for part in parts])
        assert not any(isinstance(each, CoreError) for each in answers)
        return [abs(each.duty_w) for each in answers if isinstance(each, RateResult)]

    rising = [
        duties([bank(rows) for rows in range(1, 25)]),
        duties([bank(6, tube_length_m=0.5 * 1.3**i) for i in range(10)]),
    ]
    if inside is not WATER:
        rising.append(duties([bank(6, tubes_per_row=n) for n in range(8, 60, 4)]))
    for found in rising:
        assert all(after > before for before, after in pairwise(found))


@settings(fixed, max_examples=20)
@given(
    st.floats(270.0, 420.0),
    st.floats(0.5, 60.0),
    st.sampled_from(["held-surface", "condensing", "single-phase"]),
)
def test_duty_rises_with_the_temperature_difference(start: float, gap: float, kind: str) -> None:
    """A hotter inside gives more, whatever the level."""

    def inside(t: float) -> Body:
        return {
            "held-surface": {"kind": kind, "temperature_k": t},
            "condensing": {"kind": kind, "fluid": "water", "saturation_temperature_k": max(t, 280.0)},
            "single-phase": {**WATER, "inlet_temperature_k": max(t, 280.0), "inlet_pressure_pa": 5e6},
        }[kind]

    outside = {"fluid": {"kind": "moist-air", "humidity_ratio": 0.0}, "inlet_temperature_k": start}
    found = [rated(body(bank(6), inside(start + d), outside)).duty_w for d in (gap, 1.1 * gap)]
    assert found[1] > found[0] or start + 1.1 * gap <= 280.0  # water stays above 280 K


@settings(fixed, max_examples=20)
@given(st.sampled_from(["/outside/fouling_m2_k_w", "/inside/fouling_m2_k_w"]), st.floats(1e-5, 5e-3))
def test_fouling_lowers_the_duty(member: str, layer: float) -> None:
    """A fouling layer on either side lowers the duty and is the difference of clean and fouled resistance."""
    clean = rated(body(bank(6, 2)))
    parts = body(bank(6, 2))
    _, side, name = member.split("/")
    parts[side] = {**parts[side], name: layer}
    fouled = rated(parts)
    assert abs(fouled.duty_w) < abs(clean.duty_w)
    shares = fouled.overall.resistance_shares
    assert shares is not None
    assert (shares.outside_fouling if side == "outside" else shares.inside_fouling) > 0.0
