"""Every headline number of a result against its definition, worked out from the answer's own other numbers."""

from collections.abc import Callable
from itertools import pairwise
from math import log, pi, sqrt
from typing import Any

import msgspec
import pytest
from tests.unit.rating.bank_requests import AIR, STEAM, WATER, Body, bank, body, constant, mass, rated

from crossbank.contract import RateResult
from crossbank_service import methods

_LIQUID = constant(1000.0, 4180.0, 0.6, 8e-4)
_GAS = constant(1.2, 1005.0, 0.026, 1.8e-5, gas=True)


def _cases() -> dict[str, Body]:
    held = {"kind": "held-surface", "temperature_k": 420.0}
    return {
        "water, four passes against": body(bank(8, 4)),
        "water, four passes along": body(bank(8, 4, "with")),
        "water, one pass": body(bank(5, 1)),
        "water, one row and one tube": body(bank(1, 1, tubes_per_row=1)),
        "hot water, cold air": body(
            bank(6, 3, "against", arrangement="inline"),
            {**WATER, "inlet_temperature_k": 360.0, "fouling_m2_k_w": 2e-4},
            {"inlet_temperature_k": 280.0, "fouling_m2_k_w": 5e-4},
        ),
        "steam": body(bank(6), {**STEAM, "inlet_superheat_k": 20.0}, {"inlet_temperature_k": 280.0}),
        "held surface": body(bank(12), held, {"inlet_temperature_k": 300.0, "fouling_m2_k_w": 1e-3}),
        "constant properties": body(
            bank(4, 2),
            {**WATER, "fluid": _LIQUID, "flow_kg_s": 0.5},
            {"fluid": _GAS, "inlet_temperature_k": 340.0},
        ),
        "gas inside": body(
            bank(4, 2),
            {**WATER, "fluid": "nitrogen", "inlet_temperature_k": 420.0, "flow_kg_s": 0.4},
            {"fluid": "air", "inlet_temperature_k": 300.0},
        ),
    }


_CASES = _cases()
_FOUND: dict[str, RateResult] = {}


def _of(name: str) -> RateResult:
    if name not in _FOUND:
        _FOUND[name] = rated(_CASES[name])
    return _FOUND[name]


every = pytest.mark.parametrize("name", list(_CASES))
single_phase = pytest.mark.parametrize(
    "name", [name for name, case in _CASES.items() if case["inside"]["kind"] == "single-phase"]
)


def _some(value: float | None) -> float:
    assert value is not None
    return value


@every
def test_duty_is_the_sum_of_the_rows(name: str) -> None:
    """Rows add up to the duty and hand the outside stream on to each other."""
    found = _of(name)
    assert found.duty_w == pytest.approx(sum(row.heat_w for row in found.rows), rel=1e-12)
    assert found.sensible_duty_w == found.duty_w
    assert found.latent_duty_w == 0.0
    for before, after in pairwise(found.rows):
        assert after.outside_inlet_temperature_k == pytest.approx(
            before.outside_outlet_temperature_k, abs=1e-9
        )
    assert found.rows[0].outside_inlet_temperature_k == pytest.approx(
        found.outside.inlet_temperature_k, abs=1e-9
    )
    last = found.rows[-1].outside_outlet_temperature_k
    assert last == pytest.approx(
        found.outside.outlet_temperature_k, abs=2e-3
    )  # plain mean against mixing cup


@every
def test_area_counts_every_tube(name: str) -> None:
    """area_m2 is the outer surface of all tubes in the duct."""
    found, part = _of(name), _CASES[name]["bank"]
    tubes = part["layout"]["rows"] * part["layout"]["tubes_per_row"]
    area = pi * part["tube"]["outer_diameter_m"] * part["layout"]["tube_length_m"] * tubes
    assert found.overall.area_m2 == pytest.approx(area, rel=1e-12)
    assert found.geometry.tube_count == tubes
    assert found.geometry.outside_area_m2 == found.overall.area_m2


@every
def test_conductance_and_mean_difference(name: str) -> None:
    """U*A is ua_w_k and |duty|/ua_w_k the mean difference."""
    o, duty = _of(name).overall, _of(name).duty_w
    assert _some(o.coefficient_w_m2_k) * o.area_m2 == pytest.approx(_some(o.ua_w_k), rel=1e-12)
    assert _some(o.mean_difference_k) == pytest.approx(abs(duty) / _some(o.ua_w_k), rel=1e-12)


@every
def test_log_mean_of_the_terminals_in_counterflow(name: str) -> None:
    """The log mean comes from the four terminals in counterflow; saturation at both ends of vapour."""
    found = _of(name)
    inside = found.inside
    first = second = _some(
        inside.saturation_temperature_k if inside.kind == "condensing" else inside.inlet_temperature_k
    )
    if inside.kind == "single-phase":
        second = _some(inside.outlet_temperature_k)
    a = first - found.outside.outlet_temperature_k
    b = second - found.outside.inlet_temperature_k
    if a * b <= 0.0:
        assert found.overall.log_mean_difference_k is None
        assert found.overall.crossflow_correction is None
        return
    mean = (abs(a) - abs(b)) / log(a / b)
    assert _some(found.overall.log_mean_difference_k) == pytest.approx(mean, rel=1e-9)
    correction = _some(found.overall.crossflow_correction)
    assert correction == pytest.approx(_some(found.overall.mean_difference_k) / mean, rel=1e-9)
    if name == "constant properties":
        assert 0.5 < correction <= 1.0


def test_log_mean_is_null_where_a_terminal_difference_vanishes() -> None:
    """A bank so long that the stream leaves at the surface's temperature has no log mean, and says null."""
    held = {"kind": "held-surface", "temperature_k": 420.0}
    found = rated(
        body(
            bank(60, tube_length_m=60.0),
            held,
            {"fluid": _GAS, "flow": mass(0.05), "inlet_temperature_k": 300.0},
        )
    )
    assert found.outside.outlet_temperature_k == pytest.approx(420.0, abs=1e-9)
    assert found.duty_w == pytest.approx(0.05 * 1005.0 * 120.0, rel=1e-9)
    assert found.overall.log_mean_difference_k is None
    assert found.overall.crossflow_correction is None
    assert found.overall.effectiveness == pytest.approx(1.0, abs=1e-9)


def test_correction_is_the_published_one() -> None:
    """With constant properties the correction is NTU of counterflow over NTU, from effectiveness relations."""
    found = rated(_CASES["constant properties"])
    c = 3.0 * 1005.0, 0.5 * 4180.0
    small, ratio = min(c), min(c) / max(c)
    eps, ntu = _some(found.overall.effectiveness), _some(found.overall.ntu)
    counter = log((1.0 - eps * ratio) / (1.0 - eps)) / (1.0 - ratio)
    assert _some(found.overall.crossflow_correction) == pytest.approx(counter / ntu, rel=1e-6)
    assert ntu == pytest.approx(_some(found.overall.ua_w_k) / small, rel=1e-9)
    assert eps == pytest.approx(abs(found.duty_w) / (small * 50.0), rel=1e-9)


@every
def test_effectiveness_is_the_share_of_endless_counterflow(name: str) -> None:
    """Effectiveness lies between 0 and 1 and below that of counterflow with the same NTU."""
    found = _of(name)
    eps, ntu = _some(found.overall.effectiveness), _some(found.overall.ntu)
    assert 0.0 < eps < 1.0
    assert ntu > 0.0
    assert eps <= 1.0 - 2.718281828 ** (-ntu) + 5e-3


@pytest.mark.parametrize("name", ["steam", "held surface"])
def test_one_inside_temperature_makes_the_other_stream_the_smaller(name: str) -> None:
    """Vapour and held surfaces count as endless: NTU goes on the outside stream, eps = 1 - exp(-NTU)."""
    found = _of(name)
    rise = found.outside.outlet_temperature_k - found.outside.inlet_temperature_k
    rate = found.duty_w / rise
    assert _some(found.overall.ntu) == pytest.approx(_some(found.overall.ua_w_k) / rate, rel=1e-3)
    # rows of different coefficients and heat capacities part from the one exponential by very little
    assert _some(found.overall.effectiveness) == pytest.approx(
        1.0 - 2.718281828 ** (-_some(found.overall.ntu)), rel=5e-3
    )


@every
def test_resistance_shares(name: str) -> None:
    """Shares sum to 1, and each is its own resistance over the overall one."""
    found, case = _of(name), _CASES[name]
    o, shares = found.overall, found.overall.resistance_shares
    assert shares is not None
    assert sum(msgspec.structs.astuple(shares)) == pytest.approx(1.0, abs=1e-12)
    assert shares.fin_bond == 0.0
    # heat-weighted shares against a quotient of means: the same within the spread over the cells
    total = 1.0 / _some(o.coefficient_w_m2_k)

    def close(value: float) -> Any:
        return pytest.approx(value, rel=0.03, abs=2e-4)

    h = _some(found.outside.heat_transfer_coefficient_w_m2_k)
    assert shares.outside == close(1.0 / h / total)
    assert shares.outside_fouling == close(case["outside"].get("fouling_m2_k_w", 0.0) / total)
    tube = case["bank"]["tube"]
    ratio = tube["outer_diameter_m"] / (tube["outer_diameter_m"] - 2.0 * tube["wall_thickness_m"])
    if found.inside.kind == "held-surface":
        assert shares.inside == shares.wall == shares.inside_fouling == 0.0
        return
    inner = _some(found.inside.heat_transfer_coefficient_w_m2_k)
    assert shares.inside == close(ratio / inner / total)
    fouling = case["inside"].get("fouling_m2_k_w", 0.0)
    assert shares.inside_fouling == close(ratio * fouling / total)
    wall = tube["outer_diameter_m"] * log(ratio) / (2.0 * 58.0)  # plain carbon steel, about 58 W/(m K)
    assert shares.wall == pytest.approx(wall / total, rel=0.12)


@every
def test_clean_coefficient_leaves_out_the_fouling(name: str) -> None:
    """1/U less the fouling resistances is 1/U_clean."""
    found, case = _of(name), _CASES[name]
    tube = case["bank"]["tube"]
    ratio = tube["outer_diameter_m"] / (tube["outer_diameter_m"] - 2.0 * tube["wall_thickness_m"])
    layers = case["outside"].get("fouling_m2_k_w", 0.0)
    if found.inside.kind != "held-surface":
        layers += ratio * case["inside"].get("fouling_m2_k_w", 0.0)
    left = 1.0 / _some(found.overall.coefficient_w_m2_k) - layers
    assert 1.0 / _some(found.overall.coefficient_clean_w_m2_k) == pytest.approx(left, rel=2e-3)


@every
def test_mean_coefficients_reproduce_the_duty(name: str) -> None:
    """A mean coefficient is mean flux over mean film difference: sum(q)/sum(q/h), outside and inside alike."""
    found = _of(name)
    heat = [abs(row.heat_w) for row in found.rows]
    outer = [row.outside_heat_transfer_coefficient_w_m2_k for row in found.rows]
    mean = sum(heat) / sum(q / _some(h) for q, h in zip(heat, outer, strict=True))
    assert _some(found.outside.heat_transfer_coefficient_w_m2_k) == pytest.approx(mean, rel=1e-9)
    if found.inside.kind == "held-surface":
        assert all(row.inside_heat_transfer_coefficient_w_m2_k is None for row in found.rows)
        return
    inner = [row.inside_heat_transfer_coefficient_w_m2_k for row in found.rows]
    mean = sum(heat) / sum(q / _some(h) for q, h in zip(heat, inner, strict=True))
    assert _some(found.inside.heat_transfer_coefficient_w_m2_k) == pytest.approx(mean, rel=1e-9)


@every
def test_row_walls_follow_from_the_film(name: str) -> None:
    """In each row the flux over the outside coefficient (and fouling) spans from the stream to the metal."""
    found, case = _of(name), _CASES[name]
    area = found.overall.area_m2 / len(found.rows)
    for row in found.rows:
        flux = row.heat_w / area
        mean = 0.5 * (row.outside_inlet_temperature_k + row.outside_outlet_temperature_k)
        h = _some(row.outside_heat_transfer_coefficient_w_m2_k)
        wall = mean + flux * (1.0 / h + case["outside"].get("fouling_m2_k_w", 0.0))
        # mean of the row's ends against its own exponential: (dT row)^2/(12 dT film)
        step = row.outside_outlet_temperature_k - row.outside_inlet_temperature_k
        slack = 0.05 + abs(step * step / (8.0 * (wall - mean)))
        assert _some(row.wall_temperature_k) == pytest.approx(wall, abs=slack)


@every
def test_wall_extremes_enclose_the_rows(name: str) -> None:
    """The coldest and hottest metal enclose every row's wall and lie between the inlets."""
    found = _of(name)
    low, high = _some(found.wall.min_temperature_k), _some(found.wall.max_temperature_k)
    walls = [_some(row.wall_temperature_k) for row in found.rows]
    assert low - 1e-6 <= min(walls)
    assert max(walls) <= high + 1e-6
    ends = sorted((found.outside.inlet_temperature_k, _some(found.inside.inlet_temperature_k)))
    assert ends[0] - 1e-6 <= low <= high <= ends[1] + 1e-6
    places = found.wall.min_at, found.wall.max_at
    assert all(place is not None and 1 <= place.row <= len(found.rows) for place in places)
    hot_inside = _some(found.inside.inlet_temperature_k) > found.outside.inlet_temperature_k
    if found.inside.kind != "held-surface":
        assert [place.face for place in places if place] == (
            ["outside", "inside"] if hot_inside else ["inside", "outside"]
        )
    assert found.wall.fin_tip_max_temperature_k is None


@every
def test_closest_approach(name: str) -> None:
    """The closest approach is no wider than either terminal difference and positive."""
    found = _of(name)
    closest = _some(found.overall.closest_approach_k)
    hot_end = abs(_some(found.inside.inlet_temperature_k) - found.outside.outlet_temperature_k)
    assert closest > 0.0
    if found.inside.kind == "condensing":
        hot_end = abs(_some(found.inside.saturation_temperature_k) - found.outside.outlet_temperature_k)
    assert closest <= hot_end + 0.5


@every
def test_outside_drop_is_friction_and_momentum(name: str) -> None:
    """Friction and momentum add up, rows add up, and the momentum is the empty duct's."""
    found = _of(name)
    o = found.outside
    assert o.pressure_drop_pa == pytest.approx(
        o.friction_pressure_drop_pa + o.momentum_pressure_drop_pa, rel=1e-12
    )
    assert sum(_some(row.pressure_drop_pa) for row in found.rows) == pytest.approx(
        o.pressure_drop_pa, rel=1e-9
    )
    face_flux = o.mass_flow_kg_s / found.geometry.face_area_m2
    momentum = face_flux**2 * (1.0 / o.outlet_density_kg_m3 - 1.0 / o.inlet_density_kg_m3)
    assert o.momentum_pressure_drop_pa == pytest.approx(momentum, rel=5e-3, abs=1e-9)
    inlet_pressure = _CASES[name]["outside"]["inlet_pressure_pa"]
    assert o.outlet_pressure_pa == pytest.approx(inlet_pressure - o.pressure_drop_pa, rel=1e-9)
    assert o.flow_power_w == pytest.approx(
        o.mass_flow_kg_s / o.inlet_density_kg_m3 * o.pressure_drop_pa, rel=1e-12
    )


@every
def test_velocities_and_reynolds_number(name: str) -> None:
    """Approach, highest velocity and Reynolds number belong to the empty duct and the narrowest section."""
    found = _of(name)
    o, g = found.outside, found.geometry
    flow = o.mass_flow_kg_s
    assert o.approach_velocity_m_s == pytest.approx(
        flow / (o.inlet_density_kg_m3 * g.face_area_m2), rel=1e-12
    )
    thinnest = min(o.inlet_density_kg_m3, o.outlet_density_kg_m3)
    thickest = max(o.inlet_density_kg_m3, o.outlet_density_kg_m3)
    flux = flow / g.free_flow_area_m2
    assert flux / thickest * (1.0 - 1e-6) <= o.max_velocity_m_s <= flux / thinnest * (1.0 + 1e-6)
    mean = sum(row.reynolds_max for row in found.rows) / len(found.rows)
    assert o.reynolds_max == pytest.approx(mean, rel=1e-12)


@single_phase
def test_inside_velocity_flux_and_balance(name: str) -> None:
    """Mass flux is the flow of a pass over its bores; velocities carry it at the terminals."""
    found, case = _of(name), _CASES[name]
    i, layout, tube = found.inside, case["bank"]["layout"], case["bank"]["tube"]
    bore = tube["outer_diameter_m"] - 2.0 * tube["wall_thickness_m"]
    tubes = layout["tubes_per_row"] * layout["rows"] // case["bank"]["circuit"]["passes"]
    flux = case["inside"]["flow_kg_s"] / (tubes * 0.25 * pi * bore**2)
    assert _some(i.mass_flux_kg_m2_s) == pytest.approx(flux, rel=1e-12)
    assert _some(i.outlet_pressure_pa) == pytest.approx(
        case["inside"]["inlet_pressure_pa"] - _some(i.pressure_drop_pa), rel=1e-12
    )
    assert _some(i.inlet_velocity_m_s) > 0.0
    if name == "constant properties":
        assert _some(i.inlet_velocity_m_s) == pytest.approx(flux / 1000.0, rel=1e-12)
        assert _some(i.reynolds) == pytest.approx(flux * bore / 8e-4, rel=1e-12)
        duty = 0.5 * 4180.0 * (_some(i.inlet_temperature_k) - _some(i.outlet_temperature_k))
        assert found.duty_w == pytest.approx(duty, rel=1e-9)


def test_constant_properties_inside_drop_by_hand() -> None:
    """Two passes of laminar flow: 64/Re friction and 1.5 velocity heads a pass, roughness of no account."""
    found, case = rated(_CASES["constant properties"]), _CASES["constant properties"]
    bore, length = 0.021, 2.0
    flux = 0.5 / (40 * 0.25 * pi * bore**2)
    re = flux * bore / 8e-4
    assert re < 2300.0
    head = flux**2 / 2000.0
    drop = 2.0 * head * (64.0 / re * length / bore + 1.5)
    assert _some(found.inside.pressure_drop_pa) == pytest.approx(drop, rel=1e-4)
    assert any(
        each.pointer == "/bank/circuit/loss_coefficient" and each.value == 1.5 for each in found.assumed
    )
    own = rated({**case, "bank": {**case["bank"], "circuit": {"passes": 2, "loss_coefficient": 4.0}}})
    assert _some(own.inside.pressure_drop_pa) - _some(found.inside.pressure_drop_pa) == pytest.approx(
        2.0 * head * 2.5, rel=1e-6
    )


def test_condensate_carries_the_duty() -> None:
    """Condensate is heat over the enthalpy between inlet vapour and condensate, row by row and in sum."""
    found = _of("steam")
    per_kg = found.duty_w / _some(found.inside.condensate_kg_s)
    # IAPWS-IF97 at 3 bar: 2163.5 kJ/kg, and 20 K of superheat at about 2.2 kJ/(kg K)
    assert per_kg == pytest.approx(2163.5e3 + 20.0 * 2.22e3, rel=2e-3)
    rows = [_some(row.condensate_kg_s) for row in found.rows]
    assert sum(rows) == pytest.approx(_some(found.inside.condensate_kg_s), rel=1e-12)
    for row, condensate in zip(found.rows, rows, strict=True):
        assert row.heat_w == pytest.approx(condensate * per_kg, rel=1e-4)
        assert row.outlet_quality == 0.0
    assert _some(found.inside.inlet_temperature_k) - _some(
        found.inside.saturation_temperature_k
    ) == pytest.approx(20.0)
    assert found.inside.outlet_subcooling_k == 0.0


def test_pass_of_each_row() -> None:
    """`against` begins in the last rows, `with` in the first."""
    assert [row.pass_ for row in _of("water, four passes against").rows] == [4, 4, 3, 3, 2, 2, 1, 1]
    assert [row.pass_ for row in _of("water, four passes along").rows] == [1, 1, 2, 2, 3, 3, 4, 4]
    assert [row.row for row in _of("water, one pass").rows] == [1, 2, 3, 4, 5]


@pytest.mark.parametrize("name", ["water, four passes against", "steam", "held surface"])
def test_rows_left_out_change_nothing_else(name: str) -> None:
    """Without rows the rest of the answer is the same, but for the hash of the request."""
    full = msgspec.to_builtins(_of(name))
    short = msgspec.to_builtins(rated({**_CASES[name], "detail": {"rows": False}}))
    assert short["rows"] == []
    for each in (full, short):
        each.pop("rows")
        each["record"].pop("input_sha256")
    assert short == full


def test_lumped_rating_has_no_rows_and_reports_its_mean() -> None:
    """One set of coefficients: no rows, and the one coefficient is what the shares are made of."""
    found = rated({**_CASES["water, four passes against"], "detail": {"resolution": "bank"}})
    assert found.rows == []
    o, shares = found.overall, found.overall.resistance_shares
    assert shares is not None
    h = _some(found.outside.heat_transfer_coefficient_w_m2_k)
    assert shares.outside == pytest.approx(_some(o.coefficient_w_m2_k) / h, rel=1e-9)
    assert found.duty_w == pytest.approx(_of("water, four passes against").duty_w, rel=0.02)


@pytest.mark.parametrize("name", ["water, four passes against", "steam", "held surface"])
def test_comparisons_repeat_the_rating_by_every_other_method(name: str) -> None:
    """Each comparison is the full rating one would get by naming its method."""
    case = _CASES[name]
    found = rated({**case, "detail": {"compare_methods": True}})
    assert found.comparisons is not None
    chosen = {used.role: used.method for used in found.methods}
    seen = {(each.role, each.method) for each in found.comparisons}
    assert len(seen) == len(found.comparisons)
    assert not seen & set(chosen.items())
    for role, used_here in chosen.items():
        others = {method for r, method in seen if r == role}
        known = {m.slug for m in methods.in_role(role)}
        assert others <= known
        if role.startswith("outside"):
            expected = {m.slug for m in methods.in_role(role) if "plain" in m.surfaces}
            assert others == expected - {used_here}
    for each in found.comparisons[::3]:
        named = rated({**case, "methods": {each.role: each.method}})
        assert each.duty_w == named.duty_w
        assert each.outside_pressure_drop_pa == named.outside.pressure_drop_pa
        assert each.outside_outlet_temperature_k == named.outside.outlet_temperature_k
        assert each.inside_pressure_drop_pa == named.inside.pressure_drop_pa
        used = next(used for used in named.methods if used.role == each.role)
        assert used.method == each.method
        assert used.in_range == each.in_range
    assert rated(case).comparisons is None


def test_assumed_names_every_open_number() -> None:
    """What the request left open is listed with pointer, value and unit; what it gave is not."""

    def pointers(case: Body) -> dict[str, float]:
        return {each.pointer: each.value for each in rated(case).assumed}

    open_case = body(bank(6, 2), WATER, {"elevation_m": 1500.0})
    said = pointers(open_case)
    assert said["/bank/layout/side_gap_m"] == pytest.approx(0.0125)
    # standard atmosphere at 1500 m
    assert said["/outside/inlet_pressure_pa"] == pytest.approx(84556.0, abs=1.0)
    assert said["/bank/tube/roughness_m"] == 4.5e-5
    assert said["/outside/fouling_m2_k_w"] == said["/inside/fouling_m2_k_w"] == 0.0
    assert said["/bank/circuit/loss_coefficient"] == 1.5
    closed = body(
        bank(6, 2, side_gap_m=0.01, loss_coefficient=2.0),
        {**WATER, "fouling_m2_k_w": 1e-4},
        {"fouling_m2_k_w": 1e-4},
    )
    assert "/bank/layout/side_gap_m" not in pointers(closed)
    assert "/bank/circuit/loss_coefficient" not in pointers(closed)
    assert "/inside/fouling_m2_k_w" not in pointers(closed)
    assert "/inside/inlet_superheat_k" in pointers(body(inside=STEAM))
    assert "/inside/inlet_superheat_k" not in pointers(body(inside={**STEAM, "inlet_superheat_k": 5.0}))


def test_methods_carry_their_records() -> None:
    """Each method of a result repeats the slug, source and scatter of its record."""
    for name in ("water, four passes against", "steam", "held surface"):
        found = _of(name)
        roles = [used.role for used in found.methods]
        assert roles == ["outside_heat_transfer", "outside_pressure_drop"] + (
            [] if found.inside.kind == "held-surface" else ["inside_heat_transfer", "inside_pressure_drop"]
        )
        for used in found.methods:
            record = methods.method(used.role, used.method)
            assert used.source == record.source
            assert used.scatter_fraction == record.scatter_fraction
            assert (used.range_note is None) == used.in_range


def test_identity_is_echoed() -> None:
    """Label and reference come back as they were given, and neither changes the hash."""
    plain = rated(_CASES["steam"])
    named = rated({**_CASES["steam"], "label": "a", "reference": {"equipment": "H-1"}})
    assert named.label == "a"
    assert named.reference is not None
    assert named.reference.equipment == "H-1"
    assert named.record == plain.record


_FACE = 20 * 0.05 * 2.0


@pytest.mark.parametrize(
    "flow",
    [
        lambda volume: {"kind": "actual-volume", "m3_s": volume},
        lambda volume: {"kind": "approach-velocity", "m_s": volume / _FACE},
        # an ideal gas: volume in proportion to temperature over pressure
        lambda volume: {
            "kind": "reference-volume",
            "m3_s": volume * 273.15 / 350.0 * 0.9,
            "reference_temperature_k": 273.15,
            "reference_pressure_pa": 101325.0 / 0.9,
        },
    ],
)
def test_flows_of_every_kind_are_one_mass_flow(flow: Callable[[float], Body]) -> None:
    """The same stream said as mass, volume, velocity or reference volume gives the same rating."""
    by_mass = rated(body())
    other = rated(body(outside={"flow": flow(3.0 / by_mass.outside.inlet_density_kg_m3)}))
    assert other.outside.mass_flow_kg_s == pytest.approx(3.0, rel=1e-9)
    assert other.duty_w == pytest.approx(by_mass.duty_w, rel=1e-9)
    assert other.outside.approach_velocity_m_s == pytest.approx(
        by_mass.outside.approach_velocity_m_s, rel=1e-9
    )


def test_diagonal_gap_governs_flat_staggered_banks() -> None:
    """In a flat staggered bank velocity and Reynolds number are those of the diagonal gaps."""
    d, st, sl = 0.025, 0.075, 0.025
    found = rated(body(bank(8, transverse_pitch_m=st, longitudinal_pitch_m=sl), STEAM))
    diagonal = 2.0 * (sqrt(0.25 * st * st + sl * sl) - d)
    assert diagonal < st - d
    assert found.geometry.free_flow_area_m2 == pytest.approx(20 * diagonal * 2.0, rel=1e-12)


def test_moist_air_is_carried_through_dry() -> None:
    """Humidity goes out as it came in, and the relative humidity at the outlet is that of the outlet state."""
    found: Any = _of("water, four passes against")
    assert found.outside.outlet_humidity_ratio == AIR["humidity_ratio"]
    assert found.outside.moisture_removed_kg_s == 0.0
    vapour = 0.005 / (0.621945 + 0.005) * found.outside.outlet_pressure_pa
    t = found.outside.outlet_temperature_k - 273.15
    # Magnus form, 0.5 % between 0 and 60 C
    saturated = 610.94 * 2.718281828 ** (17.625 * t / (t + 243.04))
    assert found.outside.outlet_relative_humidity == pytest.approx(vapour / saturated, rel=0.01)
