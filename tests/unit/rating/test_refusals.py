"""What contradicts itself is refused by name, with a pointer to the member and what would be accepted."""

from typing import Any

import msgspec
import pytest
from tests.unit.rating.bank_requests import AIR, STEAM, WATER, Body, bank, body, mass, rated, refused, request

from crossbank.contract import RateRequest, RateResult
from crossbank_service.errors import CoreError
from crossbank_service.rating import rate


def _only(error: CoreError, code: str, pointer: str) -> Any:
    assert error.code == code
    assert [fault.pointer for fault in error.faults] == [pointer]
    fault = error.faults[0]
    assert fault.detail
    return fault


@pytest.mark.parametrize(
    ("members", "pointer", "at_least", "at_most"),
    [
        ({"wall_thickness_m": 0.0125}, "/bank/tube/wall_thickness_m", None, 0.0125),
        ({"transverse_pitch_m": 0.025}, "/bank/layout/transverse_pitch_m", 0.025, None),
        (
            {"arrangement": "inline", "longitudinal_pitch_m": 0.0249},
            "/bank/layout/longitudinal_pitch_m",
            0.025,
            None,
        ),
        # half of 0.03 and 0.02 make a diagonal of exactly one diameter
        (
            {"transverse_pitch_m": 0.03, "longitudinal_pitch_m": 0.0199},
            "/bank/layout/longitudinal_pitch_m",
            0.02,
            None,
        ),
        # rows three apart touch straight behind each other
        (
            {"transverse_pitch_m": 0.1, "longitudinal_pitch_m": 0.012},
            "/bank/layout/longitudinal_pitch_m",
            0.0125,
            None,
        ),
    ],
)
def test_tubes_that_touch(members: Body, pointer: str, at_least: float | None, at_most: float | None) -> None:
    """Walls without a bore and tubes that touch are impossible; the limit is said."""
    fault = _only(refused(body(bank(6, **members))), "impossible", pointer)
    assert fault.unit == "m"
    if at_least is not None:
        assert fault.at_least == pytest.approx(at_least, rel=1e-9)
    if at_most is not None:
        assert fault.at_most == pytest.approx(at_most, rel=1e-9)


def test_pitches_just_clear_of_each_other_are_rated() -> None:
    """Just beyond each limit there is an answer."""
    clear: tuple[Body, ...] = (
        {"wall_thickness_m": 0.012},
        {"transverse_pitch_m": 0.0251},
        {"arrangement": "inline", "longitudinal_pitch_m": 0.0251},
        {"transverse_pitch_m": 0.03, "longitudinal_pitch_m": 0.0202},
        {"transverse_pitch_m": 0.1, "longitudinal_pitch_m": 0.0126},
    )
    for members in clear:
        found = rated(body(bank(6, **members), STEAM, {"flow": mass(0.05), "inlet_temperature_k": 300.0}))
        assert found.duty_w > 0.0
    # two staggered rows have none behind each other, one row has no pitch along the stream
    close: Body = {"transverse_pitch_m": 0.1, "longitudinal_pitch_m": 0.012}
    assert rated(body(bank(2, **close), STEAM)).duty_w > 0.0
    assert rated(body(bank(1, arrangement="inline", longitudinal_pitch_m=0.001), STEAM)).duty_w > 0.0


@pytest.mark.parametrize(
    "members",
    [
        {"tubes_per_row": 1, "side_gap_m": 0.0},
        {"tubes_per_row": 1, "side_gap_m": 0.0, "arrangement": "inline"},
        {
            "tubes_per_row": 1,
            "side_gap_m": 0.005,
            "transverse_pitch_m": 0.075,
            "longitudinal_pitch_m": 0.0125001,
        },
    ],
)
def test_a_bank_that_leaves_no_way_through(members: Body) -> None:
    """Tubes that fill the duct from wall to wall leave no section: impossible, with a pointer to the gap."""
    error = refused(body(bank(4, **members), STEAM))
    assert error.code == "impossible"
    assert "/bank/layout/side_gap_m" in {fault.pointer for fault in error.faults}


@pytest.mark.parametrize(("rows", "passes"), [(6, 4), (5, 2), (1, 2), (7, 3)])
def test_passes_that_do_not_divide_the_rows(rows: int, passes: int) -> None:
    """Rows are shared evenly among the passes; the detail says what would do."""
    fault = _only(refused(body(bank(rows, passes))), "impossible", "/bank/circuit/passes")
    assert fault.given == passes
    assert "1" in fault.detail


def test_vapour_condenses_in_one_pass() -> None:
    """Condensing inside in more than one pass is refused."""
    error = refused(body(bank(6, 2), STEAM))
    assert [fault.pointer for fault in error.faults] == ["/bank/circuit/passes"]


@pytest.mark.parametrize(
    ("inside", "code", "pointer"),
    [
        ({**STEAM, "inlet_pressure_pa": 2.3e7}, "impossible", "/inside/inlet_pressure_pa"),
        ({**STEAM, "inlet_pressure_pa": 1e3, "fluid": "ammonia"}, "impossible", "/inside/inlet_pressure_pa"),
        (
            {"kind": "condensing", "fluid": "water", "saturation_temperature_k": 650.0},
            "impossible",
            "/inside/saturation_temperature_k",
        ),
        ({**STEAM, "fluid": "steem"}, "invalid-input", "/inside/fluid"),
        ({**STEAM, "fluid": {"kind": "pure", "name": "nitrogen"}}, "invalid-input", "/inside/fluid/name"),
        ({**WATER, "inlet_temperature_k": 270.0}, "impossible", "/inside/inlet_temperature_k"),
        ({**WATER, "fluid": "water-of-life"}, "invalid-input", "/inside/fluid"),
        (
            {**WATER, "fluid": {"kind": "solution", "name": "ethylene-glycol-water", "mass_fraction": 0.9}},
            "impossible",
            "/inside/fluid/mass_fraction",
        ),
        (
            {
                **WATER,
                "inlet_temperature_k": 255.0,
                "fluid": {"kind": "solution", "name": "ethylene-glycol-water", "mass_fraction": 0.3},
            },
            "impossible",
            "/inside/inlet_temperature_k",
        ),
        (
            {
                **WATER,
                "inlet_temperature_k": 500.0,
                "fluid": {"kind": "solution", "name": "propylene-glycol-water", "mass_fraction": 0.3},
            },
            "impossible",
            "/inside/inlet_temperature_k",
        ),
        (
            {**WATER, "fluid": {"kind": "solution", "name": "whisky", "mass_fraction": 0.4}},
            "invalid-input",
            "/inside/fluid/name",
        ),
        (
            {**WATER, "fluid": {"kind": "moist-air", "humidity_ratio": 0.5}},
            "impossible",
            "/inside/fluid/humidity_ratio",
        ),
    ],
)
def test_inside_states_that_cannot_be(inside: Body, code: str, pointer: str) -> None:
    """Names that are not known, pressures beyond the critical one, freezing and too hot solutions."""
    _only(refused(body(inside=inside)), code, pointer)


def test_limits_of_condensing_name_the_critical_point() -> None:
    """The refusal of a supercritical pressure carries limits within the critical pressure of water."""
    fault = refused(body(inside={**STEAM, "inlet_pressure_pa": 2.3e7})).faults[0]
    assert fault.at_most is not None
    assert 1.8e7 < fault.at_most < 2.2064e7
    assert "2.2064e+07" in fault.detail
    assert rated(body(inside={**STEAM, "inlet_pressure_pa": fault.at_most})).duty_w > 0.0


def test_glycol_below_its_freezing_point_says_where_it_freezes() -> None:
    """The refusal gives the freezing temperature: 30 % ethylene glycol at -14 to -16 C."""
    inside = {
        **WATER,
        "inlet_temperature_k": 255.0,
        "fluid": {"kind": "solution", "name": "ethylene-glycol-water", "mass_fraction": 0.3},
    }
    fault = refused(body(inside=inside)).faults[0]
    assert fault.at_least == pytest.approx(258.5, abs=1.0)


@pytest.mark.parametrize(
    ("outside", "code", "pointers"),
    [
        (
            {"inlet_pressure_pa": 1e5, "elevation_m": 0.0},
            "invalid-input",
            ["/outside/inlet_pressure_pa", "/outside/elevation_m"],
        ),
        ({"fluid": {"kind": "moist-air"}}, "invalid-input", None),
        (
            {"fluid": {"kind": "moist-air", "relative_humidity": 0.5, "humidity_ratio": 0.01}},
            "invalid-input",
            ["/outside/fluid/relative_humidity", "/outside/fluid/humidity_ratio"],
        ),
        (
            {"fluid": {"kind": "moist-air", "wet_bulb_temperature_k": 355.0}},
            "impossible",
            ["/outside/fluid/wet_bulb_temperature_k"],
        ),
        (
            {"fluid": {"kind": "moist-air", "dew_point_temperature_k": 352.0}},
            "impossible",
            ["/outside/fluid/dew_point_temperature_k"],
        ),
        (
            {"fluid": {"kind": "moist-air", "humidity_ratio": 0.05}, "inlet_temperature_k": 290.0},
            "impossible",
            ["/outside/fluid/humidity_ratio"],
        ),
        (
            {"fluid": {"kind": "moist-air", "humidity_ratio": 0.0}, "inlet_temperature_k": 2400.0},
            "impossible",
            ["/outside/inlet_temperature_k"],
        ),
        ({"fluid": "phlogiston"}, "invalid-input", ["/outside/fluid"]),
        ({"fluid": "water", "inlet_temperature_k": 640.0, "inlet_pressure_pa": 2.1e7}, "impossible", None),
        (
            {
                "fluid": "nitrogen",
                "flow": {
                    "kind": "reference-volume",
                    "m3_s": 1.0,
                    "reference_temperature_k": 151.0,
                    "reference_pressure_pa": 1e8,
                },
            },
            "impossible",
            ["/outside/flow/reference_temperature_k"],
        ),
    ],
)
def test_outside_states_that_cannot_be(outside: Body, code: str, pointers: list[str] | None) -> None:
    """Either-or pairs, supersaturated air, wet bulbs above the dry bulb, unknown names, states near critical."""
    parts = body(outside=outside)
    if "elevation_m" in outside:
        parts["outside"]["inlet_pressure_pa"] = 1e5
    error = refused(parts)
    assert error.code == code
    if pointers is not None:
        assert [fault.pointer for fault in error.faults] == pointers
    assert all(fault.pointer.startswith("/outside") for fault in error.faults)


def test_neither_of_a_pair() -> None:
    """Without pressure or elevation both are pointed at."""
    parts = body()
    del parts["outside"]["inlet_pressure_pa"]
    error = refused(parts)
    assert [fault.pointer for fault in error.faults] == ["/outside/inlet_pressure_pa", "/outside/elevation_m"]
    both = body(inside={**STEAM, "saturation_temperature_k": 400.0})
    assert {fault.pointer for fault in refused(both).faults} == {
        "/inside/inlet_pressure_pa",
        "/inside/saturation_temperature_k",
    }


def test_unknown_material_and_methods() -> None:
    """Names that are not known come with those that are."""
    fault = _only(refused(body(bank(material="unobtainium"))), "invalid-input", "/bank/tube/material")
    assert "carbon-steel" in fault.one_of
    for role, slug in (
        ("outside_heat_transfer", "gnielinski-1976"),
        ("inside_heat_transfer", "cavallini-2006"),
        ("outside_pressure_drop", "nobody-1900"),
    ):
        fault = _only(refused(body(methods={role: slug})), "invalid-input", f"/methods/{role}")
        assert fault.given == slug
        assert "auto" in fault.one_of
    # held surfaces use no inside method, but a wrong word is still a wrong word
    held = {"kind": "held-surface", "temperature_k": 420.0}
    _only(
        refused(body(inside=held, methods={"inside_heat_transfer": "nobody"})),
        "invalid-input",
        "/methods/inside_heat_transfer",
    )


def test_property_state_goes_with_the_lumped_rating() -> None:
    """Row by row only local properties are taken."""
    _only(refused(body(detail={"property_state": "inlet"})), "invalid-input", "/detail/property_state")


def test_tables_side_by_side() -> None:
    """Lists of one table run side by side and rise in temperature; the inlet lies inside."""
    table: Body = {
        "kind": "table",
        "temperature_k": [300.0, 400.0],
        "density_kg_m3": [1.0, 0.8],
        "heat_capacity_j_kg_k": [1000.0, 1010.0],
        "conductivity_w_m_k": [0.03, 0.035],
        "viscosity_pa_s": [2e-5, 2.3e-5],
        "gas": True,
    }
    assert rated(body(outside={"fluid": table})).duty_w < 0.0
    uneven = {**table, "density_kg_m3": [1.0]}
    _only(refused(body(outside={"fluid": uneven})), "invalid-input", "/outside/fluid/density_kg_m3")
    falling = {**table, "temperature_k": [400.0, 300.0]}
    _only(refused(body(outside={"fluid": falling})), "invalid-input", "/outside/fluid/temperature_k/1")
    _only(
        refused(body(outside={"fluid": table, "inlet_temperature_k": 420.0})),
        "impossible",
        "/outside/inlet_temperature_k",
    )


def test_everything_wrong_is_said_at_once() -> None:
    """Several faults of one request come back together, broken rules first."""
    parts = body(
        bank(6, 4, wall_thickness_m=0.02, transverse_pitch_m=0.02, material="unobtainium"),
        {**WATER, "inlet_temperature_k": 200.0},
    )
    error = refused(parts)
    assert error.code == "invalid-input"
    assert {fault.pointer for fault in error.faults} == {
        "/bank/tube/material",
        "/bank/tube/wall_thickness_m",
        "/bank/layout/transverse_pitch_m",
        "/bank/circuit/passes",
        "/inside/inlet_temperature_k",
    }


def test_streams_that_choke() -> None:
    """A stream that would lose more than half its pressure is no state to rate."""
    gale = refused(body(outside={"flow": mass(400.0)}))
    _only(gale, "impossible", "/outside/flow")
    jet = refused(body(bank(6, 6), {**WATER, "flow_kg_s": 120.0}))
    _only(jet, "impossible", "/inside/flow_kg_s")


def test_vapour_faster_than_sound_is_refused() -> None:
    """Vapour that would have to enter at 375 m/s, beyond its speed of sound, is not rated."""
    inside = {"kind": "condensing", "fluid": "toluene", "inlet_pressure_pa": 1.04e5}
    brine = {"kind": "solution", "name": "calcium-chloride-water", "mass_fraction": 0.2176}
    outside = {
        "fluid": brine,
        "flow": {"kind": "approach-velocity", "m_s": 0.588},
        "inlet_temperature_k": 252.2,
    }
    part = bank(
        3,
        transverse_pitch_m=0.1143,
        longitudinal_pitch_m=0.0278,
        tubes_per_row=4,
        tube_length_m=5.03,
        outer_diameter_m=0.038,
        wall_thickness_m=0.006,
        material="copper",
    )
    methods = {"inside_heat_transfer": "thome-2003", "inside_pressure_drop": "lockhart-martinelli-1949"}
    assert refused(body(part, inside, outside, methods=methods)).code in ("impossible", "not-converged")


@pytest.mark.parametrize(
    ("parts", "pointer"),
    [
        (body(bank(3)), "/methods/outside_pressure_drop"),  # fewer than five rows
        (body(bank(6, transverse_pitch_m=0.1)), "/methods/outside_pressure_drop"),  # a = 4
        (body(outside={"flow": mass(1e-4)}), "/methods/outside_heat_transfer"),
    ],
)
def test_strict_refuses_what_is_otherwise_marked(parts: Body, pointer: str) -> None:
    """With strict an extrapolation is out-of-range; without it is answered and marked."""
    error = refused({**parts, "strict": True})
    assert error.code == "out-of-range"
    assert pointer in {fault.pointer for fault in error.faults}
    loose = rated(parts)
    marked = {f"/methods/{used.role}" for used in loose.methods if not used.in_range}
    assert marked == {fault.pointer for fault in error.faults}
    assert rated({**body(), "strict": True}).duty_w == rated(body()).duty_w


def test_a_bad_request_leaves_its_neighbours_alone() -> None:
    """Refused requests keep their place; the others are answered as if alone."""
    good, bad = request(body()), request(body(bank(6, 4)))
    answers = rate([bad, good, bad])
    assert [isinstance(each, CoreError) for each in answers] == [True, False, True]
    alone = rate([good])[0]
    assert isinstance(alone, RateResult)
    assert msgspec.json.encode(answers[1]) == msgspec.json.encode(alone)
    assert rate([]) == []


def test_unknown_members_are_refused_by_the_schema() -> None:
    """A member that is not known does not pass, at any depth."""
    for where in ((), ("bank",), ("bank", "layout"), ("outside", "flow"), ("detail",)):
        parts: Any = body(outside={"fluid": AIR})
        inner = parts
        for name in where:
            inner = inner[name]
        inner["colour"] = "red"
        with pytest.raises(msgspec.ValidationError):
            msgspec.convert(parts, RateRequest)
        del inner["colour"]
