"""Rules between members: either-or groups, lists side by side, rising lists."""

from typing import Any

import msgspec
import pytest

from crossbank.contract import RateRequest, broken_rules


def pointers(body: dict[str, Any]) -> list[str]:
    """Pointers of the broken rules of a body."""
    return [b.pointer for b in broken_rules(msgspec.convert(body, RateRequest))]


def test_a_sound_request_breaks_no_rule(body: dict[str, Any]) -> None:
    """The mill's heater is sound."""
    assert pointers(body) == []


def test_none_of_a_pair_points_at_each(body: dict[str, Any]) -> None:
    """Neither pressure nor elevation: a pointer to each, and the sentence names both."""
    del body["outside"]["inlet_pressure_pa"]
    found = broken_rules(msgspec.convert(body, RateRequest))
    assert [b.pointer for b in found] == ["/outside/inlet_pressure_pa", "/outside/elevation_m"]
    assert all("inlet_pressure_pa and elevation_m" in b.detail and b.given is None for b in found)


def test_two_of_a_pair_points_at_each_given(body: dict[str, Any]) -> None:
    """Both pressure and elevation: a pointer to each with what was given."""
    body["outside"]["elevation_m"] = 0
    found = broken_rules(msgspec.convert(body, RateRequest))
    assert {b.pointer: b.given for b in found} == {
        "/outside/inlet_pressure_pa": 101325,
        "/outside/elevation_m": 0,
    }


def test_only_the_given_members_of_a_larger_group_are_named(body: dict[str, Any]) -> None:
    """Two of four measures of humidity: a pointer to these two."""
    body["outside"]["fluid"] = {"kind": "moist-air", "relative_humidity": 0.5, "humidity_ratio": 0.01}
    assert pointers(body) == ["/outside/fluid/relative_humidity", "/outside/fluid/humidity_ratio"]


TABLE: dict[str, Any] = {
    "kind": "table",
    "temperature_k": [300, 350],
    "density_kg_m3": [1.1, 1.0],
    "heat_capacity_j_kg_k": [1000, 1010],
    "conductivity_w_m_k": [0.02, 0.03],
    "viscosity_pa_s": [1e-5, 2e-5],
}


@pytest.mark.parametrize(
    ("change", "pointer"),
    [
        ({"viscosity_pa_s": [1e-5]}, "/outside/fluid/viscosity_pa_s"),
        ({"enthalpy_j_kg": [0, 1, 2]}, "/outside/fluid/enthalpy_j_kg"),
        ({"temperature_k": [350, 300]}, "/outside/fluid/temperature_k/1"),
        ({"temperature_k": [300, 300]}, "/outside/fluid/temperature_k/1"),
    ],
)
def test_lists_run_side_by_side_and_temperatures_rise(
    body: dict[str, Any], change: dict[str, Any], pointer: str
) -> None:
    """A short list, or a temperature that does not rise, is named by its pointer."""
    body["outside"]["fluid"] = TABLE | change
    assert pointers(body) == [pointer]


def test_a_material_curve_is_checked_where_it_stands(body: dict[str, Any]) -> None:
    """Rules hold at any depth."""
    curve = {"temperature_k": [300, 400], "value": [50]}
    body["bank"]["tube"]["material"] = {"name": "own", "conductivity_w_m_k": curve}
    assert pointers(body) == ["/bank/tube/material/conductivity_w_m_k/value"]
