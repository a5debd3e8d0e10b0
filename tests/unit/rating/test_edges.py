"""The edges of the accepted range: answered with a notice where there is an answer."""

from typing import Any

import msgspec
import pytest
from tests.unit.rating.bank_requests import (
    AIR,
    STEAM,
    WATER,
    Body,
    bank,
    body,
    constant,
    mass,
    rated,
    request,
)

from crossbank.contract import RateRequest, RateResult
from crossbank_service.rating import NOTICES, rate

_HELD = {"kind": "held-surface", "temperature_k": 420.0}
_ROUTINE = {"estimate", "method-doubt"}

resolutions = pytest.mark.parametrize("resolution", ["row", "bank"])


def _codes(found: RateResult) -> set[str]:
    return {notice.code for notice in found.notices} - _ROUTINE


def _without_heat(found: RateResult) -> None:
    assert found.duty_w == 0.0
    assert found.outside.outlet_temperature_k == found.outside.inlet_temperature_k
    assert all(row.heat_w == 0.0 for row in found.rows)
    assert found.heat_balance_residual == 0.0
    assert found.overall.ua_w_k is None
    assert found.overall.resistance_shares is None


@resolutions
@pytest.mark.parametrize("inside", [_HELD, STEAM, WATER])
def test_no_outside_flow(resolution: str, inside: Body) -> None:
    """Without outside flow nothing is exchanged and nothing is lost outside."""
    found = rated(body(inside=inside, outside={"flow": mass(0.0)}, detail={"resolution": resolution}))
    _without_heat(found)
    assert _codes(found) == {"no-flow"}
    o = found.outside
    assert o.pressure_drop_pa == o.approach_velocity_m_s == o.reynolds_max == o.flow_power_w == 0.0
    assert o.outlet_pressure_pa == 101325.0
    assert o.outlet_density_kg_m3 == o.inlet_density_kg_m3 > 0.0
    if inside is WATER:
        assert found.inside.pressure_drop_pa is not None
        assert found.inside.pressure_drop_pa > 0.0
    if inside is STEAM:
        assert found.inside.condensate_kg_s == 0.0
        assert found.inside.pressure_drop_pa == 0.0


@pytest.mark.parametrize(
    "flow",
    [
        {"kind": "mass", "kg_s": 0.0},
        {"kind": "actual-volume", "m3_s": 0.0},
        {"kind": "approach-velocity", "m_s": 0.0},
        {
            "kind": "reference-volume",
            "m3_s": 0.0,
            "reference_temperature_k": 273.15,
            "reference_pressure_pa": 101325,
        },
    ],
)
def test_no_flow_in_any_words(flow: Body) -> None:
    """Zero is zero in every kind of flow."""
    assert _codes(rated(body(outside={"flow": flow}))) == {"no-flow"}


@resolutions
def test_no_inside_flow(resolution: str) -> None:
    """Without inside flow the outside stream keeps its temperature and pays its drop."""
    found = rated(body(inside={**WATER, "flow_kg_s": 0.0}, detail={"resolution": resolution}))
    _without_heat(found)
    assert _codes(found) == {"no-flow"}
    assert found.inside.pressure_drop_pa == 0.0
    assert found.inside.inlet_velocity_m_s == 0.0
    flowing = rated(body(inside={"kind": "held-surface", "temperature_k": 350.5}))
    assert found.outside.pressure_drop_pa == pytest.approx(flowing.outside.pressure_drop_pa, rel=5e-3)


@resolutions
@pytest.mark.parametrize(
    "inside",
    [
        {"kind": "held-surface", "temperature_k": 350.0},
        {"kind": "condensing", "fluid": "water", "saturation_temperature_k": 350.0},
        {**WATER, "inlet_temperature_k": 350.0},
        {**WATER, "fluid": "nitrogen", "inlet_temperature_k": 350.0, "flow_kg_s": 0.1},
    ],
)
def test_equal_inlets(resolution: str, inside: Body) -> None:
    """Equal inlets exchange nothing, and say so."""
    found = rated(body(inside=inside, detail={"resolution": resolution}))
    assert found.duty_w == 0.0
    assert _codes(found) == {"no-difference"}
    assert found.outside.pressure_drop_pa > 0.0


@pytest.mark.parametrize("tubes", [3, 48])
def test_equal_inlets_of_one_gas_in_three_passes(tubes: int) -> None:
    """Rounding along many passes does not keep equal inlets from settling."""
    part = bank(
        12,
        3,
        transverse_pitch_m=0.04764687422703028,
        longitudinal_pitch_m=0.08810391512831425,
        tubes_per_row=tubes,
        tube_length_m=0.2,
        side_gap_m=0.0,
        outer_diameter_m=0.0254,
        wall_thickness_m=0.004645426304013867,
        roughness_m=0.0,
    )
    flow = 0.0007457 * tubes
    inside = {
        **WATER,
        "fluid": "air",
        "flow_kg_s": flow,
        "inlet_temperature_k": 250.0,
        "inlet_pressure_pa": 101325.0,
    }
    slow = {"fluid": "air", "flow": {"kind": "approach-velocity", "m_s": 0.05}, "inlet_temperature_k": 250.0}
    found = rated(body(part, inside, slow, methods={"outside_pressure_drop": "jakob-1938"}))
    assert found.duty_w == 0.0
    assert _codes(found) >= {"no-difference"}


@resolutions
@pytest.mark.parametrize("difference", [1e-13, 1e-10, 1e-8, 1e-6, 1e-4, 1e-2])
@pytest.mark.parametrize("kind", ["held-surface", "single-phase", "condensing"])
def test_duty_is_continuous_through_zero(resolution: str, difference: float, kind: str) -> None:
    """However small the difference, the duty is in proportion to it, within the rounding of temperatures."""

    def duty(gap: float) -> float:
        inside: Body = {
            "held-surface": {"kind": kind, "temperature_k": 350.0 + gap},
            "single-phase": {**WATER, "inlet_temperature_k": 350.0 + gap},
            "condensing": {"kind": kind, "fluid": "water", "saturation_temperature_k": 350.0 + gap},
        }[kind]
        return rated(body(inside=inside, detail={"resolution": resolution})).duty_w

    per_kelvin = duty(0.1) / 0.1
    # temperatures carry about 1e-13 K of rounding, saturation ones of the tables about 1e-9 K
    floor = per_kelvin * (3e-9 if kind == "condensing" else 2e-12)
    assert duty(difference) == pytest.approx(per_kelvin * difference, rel=0.05, abs=floor)


@resolutions
def test_outside_hotter_than_the_vapour(resolution: str) -> None:
    """Vapour colder than the outside stream does not condense; nothing flows."""
    found = rated(
        body(inside=STEAM, outside={"inlet_temperature_k": 500.0}, detail={"resolution": resolution})
    )
    _without_heat(found)
    assert _codes(found) == {"reverse-heat-flow"}
    assert found.inside.condensate_kg_s == 0.0
    assert found.outside.pressure_drop_pa > 0.0


@resolutions
def test_heat_flows_either_way(resolution: str) -> None:
    """The duty is positive when the outside stream gains and negative when it is cooled."""
    detail = {"resolution": resolution}
    heated = rated(
        body(
            inside={**WATER, "inlet_temperature_k": 360.0},
            outside={"inlet_temperature_k": 290.0},
            detail=detail,
        )
    )
    cooled = rated(body(inside=WATER, detail=detail))
    assert heated.duty_w > 0.0 > cooled.duty_w
    assert heated.outside.outlet_temperature_k > 290.0
    assert cooled.outside.outlet_temperature_k < 350.0


@resolutions
def test_liquid_inside_that_boils_is_answered_as_a_liquid(resolution: str) -> None:
    """Water at one bar under gas of 700 K is rated as a liquid, with the margin said."""
    inside = {**WATER, "flow_kg_s": 0.2, "inlet_temperature_k": 350.0, "inlet_pressure_pa": 1e5}
    found = rated(
        body(inside=inside, outside={"inlet_temperature_k": 700.0}, detail={"resolution": resolution})
    )
    notice = next(notice for notice in found.notices if notice.code == "inside-boils")
    assert "372.7" in notice.text  # saturation at 1 bar, 372.76 K
    assert notice.pointer == "/inside/fluid"


def test_liquid_outside_that_boils_is_named() -> None:
    """A liquid across tubes hotter than its saturation is answered with a notice."""
    found = rated(
        body(inside=_HELD, outside={"fluid": "water", "flow": mass(50.0), "inlet_temperature_k": 350.0})
    )
    assert "outside-boils" in _codes(found)


def test_gas_that_condenses_on_the_tubes_is_named() -> None:
    """Steam across cold tubes is answered as a gas with a notice."""
    found = rated(
        body(
            inside={"kind": "held-surface", "temperature_k": 300.0},
            outside={
                "fluid": "water",
                "flow": mass(1.0),
                "inlet_temperature_k": 400.0,
                "inlet_pressure_pa": 1e5,
            },
        )
    )
    assert "gas-condenses" in _codes(found)


def test_dew_on_the_tubes_is_named() -> None:
    """Humid air on cold tubes is computed dry, and says so with both temperatures."""
    found = rated(
        body(
            inside={**WATER, "inlet_temperature_k": 280.0},
            outside={"fluid": {"kind": "moist-air", "relative_humidity": 0.9}, "inlet_temperature_k": 303.15},
        )
    )
    notice = next(notice for notice in found.notices if notice.code == "surface-below-dew-point")
    assert "301.3" in notice.text  # dew point of 30 C, 90 %: 28.2 C
    dry = rated(
        body(
            inside={**WATER, "inlet_temperature_k": 280.0},
            outside={
                "fluid": {"kind": "moist-air", "relative_humidity": 0.02},
                "inlet_temperature_k": 303.15,
            },
        )
    )
    assert "surface-below-dew-point" not in _codes(dry)


def test_freezing_of_the_inside_liquid_is_named() -> None:
    """Water under air of -30 C freezes at the wall; half glycol does not."""
    cold = {"fluid": {"kind": "moist-air", "humidity_ratio": 0.0}, "inlet_temperature_k": 243.15}
    water = rated(body(inside={**WATER, "inlet_temperature_k": 276.0, "flow_kg_s": 0.3}, outside=cold))
    assert "freezing" in _codes(water)
    glycol = {"kind": "solution", "name": "ethylene-glycol-water", "mass_fraction": 0.5}
    mixed = rated(body(inside={**WATER, "fluid": glycol, "inlet_temperature_k": 276.0}, outside=cold))
    assert "freezing" not in _codes(mixed)


def test_flow_far_below_the_methods_range_is_answered() -> None:
    """A trickle is answered and marked as an extrapolation."""
    found = rated(body(outside={"flow": mass(1e-4)}))
    assert found.duty_w < 0.0
    outside = next(used for used in found.methods if used.role == "outside_heat_transfer")
    assert outside.in_range is False
    assert outside.range_note is not None
    assert "method-out-of-range" in _codes(found)


@pytest.mark.parametrize("flow", [1e-7, 1e-3, 1.0, 1e2])
@pytest.mark.parametrize("rows", [1, 60])
@pytest.mark.parametrize("inside", [_HELD, STEAM, WATER])
def test_flows_over_nine_decades(flow: float, rows: int, inside: Body) -> None:
    """From a trickle to a gale there is an answer or a refusal that says the stream chokes."""
    answer = rate([request(body(bank(rows), inside, {"flow": mass(flow), "inlet_temperature_k": 300.0}))])[0]
    if isinstance(answer, RateResult):
        assert abs(answer.duty_w) <= flow * 1.1e3 * 130.0
        assert answer.overall.effectiveness is not None
        assert 0.0 <= answer.overall.effectiveness <= 1.0 + 1e-9
    else:
        assert answer.code == "impossible"
        assert answer.faults[0].pointer == "/outside/flow"
        assert flow == 1e2


def test_side_gap_wider_than_half_a_tube_gap_is_named() -> None:
    """A wide lane at the wall is said to bypass."""
    assert "side-gap-bypass" in _codes(rated(body(bank(side_gap_m=0.05))))
    assert "side-gap-bypass" not in _codes(rated(body(bank(side_gap_m=0.0125))))


def test_properties_held_at_the_edge_of_a_table_are_named() -> None:
    """A table that ends before the wall's temperature is held at its edge, and says so."""
    table = constant(1.2, 1005.0, 0.026, 1.8e-5, gas=True)
    for name in ("density_kg_m3", "heat_capacity_j_kg_k", "conductivity_w_m_k", "viscosity_pa_s"):
        table[name] = table[name] * 2
    table["temperature_k"] = [290.0, 400.0]
    found = rated(body(inside=_HELD, outside={"fluid": table, "inlet_temperature_k": 300.0}))
    assert "property-out-of-range" in _codes(found)


def test_every_notice_is_in_the_catalogue() -> None:
    """Codes and severities come from the one catalogue; only texts may say more."""
    for parts in (body(), body(inside=STEAM), body(inside=_HELD, outside={"flow": mass(0.0)})):
        for notice in rated(parts).notices:
            assert notice.severity == NOTICES[notice.code].severity
    assert any(notice.code == "estimate" for notice in rated(body()).notices)


@pytest.mark.parametrize(
    ("where", "value"),
    [
        (("outside", "flow", "kg_s"), -1.0),
        (("inside", "flow_kg_s"), -1e-9),
        (("outside", "inlet_temperature_k"), 25.0),
        (("outside", "inlet_pressure_pa"), 1.0),
        (("bank", "layout", "rows"), 0),
        (("bank", "tube", "outer_diameter_m"), 25.4),
        (("outside", "fouling_m2_k_w"), -1e-4),
        (("outside", "inlet_temperature_k"), float("nan")),
    ],
)
def test_numbers_that_cannot_be_are_refused_by_the_schema(where: tuple[str, ...], value: float) -> None:
    """Negative flows and slips of unit do not pass the schema."""
    parts: Any = msgspec.json.decode(msgspec.json.encode(body()))
    inner = parts
    for name in where[:-1]:
        inner = inner[name]
    inner[where[-1]] = value
    with pytest.raises(msgspec.ValidationError):
        msgspec.convert(parts, RateRequest)


def test_dry_moist_air_is_air() -> None:
    """Moist air without moisture is the pure gas `air` within half a percent."""
    dry = rated(
        body(inside=_HELD, outside={"fluid": {**AIR, "humidity_ratio": 0.0}, "inlet_temperature_k": 300.0})
    )
    pure = rated(body(inside=_HELD, outside={"fluid": "air", "inlet_temperature_k": 300.0}))
    assert dry.duty_w == pytest.approx(pure.duty_w, rel=5e-3)
    assert dry.outside.pressure_drop_pa == pytest.approx(pure.outside.pressure_drop_pa, rel=5e-3)
