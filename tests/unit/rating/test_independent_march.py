"""Whole ratings against a row march that shares nothing with the service but the published formulas."""

import pytest
from tests.unit.rating import row_march
from tests.unit.rating.bank_requests import Body, bank, body, mass, rated

# a row takes one coefficient at its mean state in the march and one a cell in the service; the properties
# come from other equations of state (moist air: 0.05 % in cp, 0.1 % in viscosity)
CLOSE = 2e-3

_METHODS = {"outside_heat_transfer": "gnielinski-1979", "outside_pressure_drop": "gaddis-gnielinski-1985"}


def _plain_metal(conductivity: float) -> Body:
    return {"name": "plain", "conductivity_w_m_k": conductivity}


def test_steam_heater_of_staggered_plain_tubes() -> None:
    """Twelve rows of steam in cold moist air agree in duty, condensate and both pressure drops."""
    tubes = row_march.Tubes(True, 0.0254, 0.0021, 0.0508, 0.0445, 12, 20, 2.0, 50.0)
    march = row_march.steam_heater(tubes, row_march.moist_air(0.002), 4.2, 268.15, 101325.0, 4e5)
    part = bank(
        12,
        transverse_pitch_m=0.0508,
        longitudinal_pitch_m=0.0445,
        outer_diameter_m=0.0254,
        wall_thickness_m=0.0021,
        material=_plain_metal(50.0),
    )
    found = rated(
        body(
            part,
            {"kind": "condensing", "fluid": "water", "inlet_pressure_pa": 4e5},
            {
                "fluid": {"kind": "moist-air", "humidity_ratio": 0.002},
                "flow": mass(4.2),
                "inlet_temperature_k": 268.15,
            },
            methods=_METHODS,
        )
    )
    assert found.duty_w == pytest.approx(sum(march.heat), rel=CLOSE)
    assert [row.heat_w for row in found.rows] == pytest.approx(march.heat, rel=CLOSE)
    assert found.outside.outlet_temperature_k == pytest.approx(march.outlet, abs=0.1)
    assert found.outside.pressure_drop_pa == pytest.approx(march.drop, rel=CLOSE)
    assert found.inside.condensate_kg_s == pytest.approx(march.flow, rel=CLOSE)
    # the steam's drop is a small difference of friction and recovered momentum: 1 % of it is 0.01 Pa
    assert found.inside.pressure_drop_pa == pytest.approx(march.inside_drop, rel=0.02)


def test_water_in_four_passes_counter_cross() -> None:
    """Water heated in four passes against hot air agrees in duty and all terminals."""
    tubes = row_march.Tubes(True, 0.0254, 0.0021, 0.0508, 0.0445, 4, 12, 1.5, 45.0)
    march = row_march.counter_cross(tubes, row_march.moist_air(0.01), 2.5, 430.0, 101325.0, 2.2, 300.0, 6e5)
    part = bank(
        4,
        4,
        transverse_pitch_m=0.0508,
        longitudinal_pitch_m=0.0445,
        outer_diameter_m=0.0254,
        wall_thickness_m=0.0021,
        tubes_per_row=12,
        tube_length_m=1.5,
        material=_plain_metal(45.0),
    )
    inside = {
        "kind": "single-phase",
        "fluid": "water",
        "flow_kg_s": 2.2,
        "inlet_temperature_k": 300.0,
        "inlet_pressure_pa": 6e5,
    }
    outside = {
        "fluid": {"kind": "moist-air", "humidity_ratio": 0.01},
        "flow": mass(2.5),
        "inlet_temperature_k": 430.0,
    }
    found = rated(body(part, inside, outside, methods=_METHODS))
    assert found.duty_w == pytest.approx(sum(march.heat), rel=CLOSE)
    assert [row.heat_w for row in found.rows] == pytest.approx(march.heat, rel=2.0 * CLOSE)
    assert found.outside.outlet_temperature_k == pytest.approx(march.outlet, abs=0.1)
    assert found.inside.outlet_temperature_k == pytest.approx(march.inside_outlet, abs=0.03)
    assert found.outside.pressure_drop_pa == pytest.approx(march.drop, rel=CLOSE)
    assert found.inside.pressure_drop_pa == pytest.approx(march.inside_drop, rel=CLOSE)


def test_hot_gas_on_in_line_tubes_with_held_surface() -> None:
    """Fourteen in-line rows cooling air from 700 K at a held surface agree in duty and drop."""
    tubes = row_march.Tubes(False, 0.038, 0.0035, 0.076, 0.0646, 14, 10, 2.4, 50.0)
    march = row_march.held_surface(tubes, row_march.dry_air, 4.0, 700.0, 1.0e5, 420.0)
    part = bank(
        14,
        arrangement="inline",
        transverse_pitch_m=0.076,
        longitudinal_pitch_m=0.0646,
        outer_diameter_m=0.038,
        wall_thickness_m=0.0035,
        tubes_per_row=10,
        tube_length_m=2.4,
    )
    found = rated(
        body(
            part,
            {"kind": "held-surface", "temperature_k": 420.0},
            {"fluid": "air", "flow": mass(4.0), "inlet_temperature_k": 700.0, "inlet_pressure_pa": 1.0e5},
            methods=_METHODS,
        )
    )
    assert found.duty_w == pytest.approx(sum(march.heat), rel=CLOSE)
    assert [row.heat_w for row in found.rows] == pytest.approx(march.heat, rel=CLOSE)
    assert found.outside.outlet_temperature_k == pytest.approx(march.outlet, abs=0.1)
    assert found.outside.pressure_drop_pa == pytest.approx(march.drop, rel=CLOSE)
