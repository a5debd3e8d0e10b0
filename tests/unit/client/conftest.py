"""Bodies and answers the client's tests share: a plywood mill's heater, numbers invented."""

import copy
from typing import Any

import pytest

BODY: dict[str, Any] = {
    "bank": {
        "layout": {
            "arrangement": "staggered",
            "transverse_pitch_m": 0.05,
            "longitudinal_pitch_m": 0.045,
            "rows": 2,
            "tubes_per_row": 10,
            "tube_length_m": 2,
        },
        "tube": {"outer_diameter_m": 0.025, "wall_thickness_m": 0.002, "material": "carbon-steel"},
    },
    "outside": {
        "fluid": {"kind": "moist-air", "relative_humidity": 0.8},
        "flow": {"kind": "mass", "kg_s": 4},
        "inlet_temperature_k": 268.15,
        "inlet_pressure_pa": 101325,
    },
    "inside": {"kind": "condensing", "fluid": "water", "inlet_pressure_pa": 400000},
}

_ROW = {
    "row": 1,
    "pass": 1,
    "heat_w": 5000.0,
    "outside_inlet_temperature_k": 268.15,
    "outside_outlet_temperature_k": 273.15,
    "inside_temperature_k": 416.7,
    "wall_temperature_k": 410.0,
    "wet": False,
    "reynolds_max": 9000.0,
    "outside_heat_transfer_coefficient_w_m2_k": 80.0,
    "inside_heat_transfer_coefficient_w_m2_k": 9000.0,
    "pressure_drop_pa": 20.0,
    "condensate_kg_s": 0.002,
    "outlet_quality": 0.0,
}

RESULT: dict[str, Any] = {
    "label": "veneer dryer heater",
    "reference": {"equipment": "H-1", "revision": None, "case": "winter", "order": None},
    "duty_w": 10000.0,
    "sensible_duty_w": 10000.0,
    "latent_duty_w": 0.0,
    "outside": {
        "mass_flow_kg_s": 4.0,
        "inlet_temperature_k": 268.15,
        "outlet_temperature_k": 273.15,
        "inlet_density_kg_m3": 1.3,
        "outlet_density_kg_m3": 1.29,
        "outlet_pressure_pa": 101285.0,
        "pressure_drop_pa": 40.0,
        "friction_pressure_drop_pa": 39.0,
        "momentum_pressure_drop_pa": 1.0,
        "approach_velocity_m_s": 3.0,
        "max_velocity_m_s": 6.0,
        "reynolds_max": 9000.0,
        "heat_transfer_coefficient_w_m2_k": 80.0,
        "fin_efficiency": None,
        "surface_efficiency": None,
        "flow_power_w": 120.0,
        "outlet_humidity_ratio": 0.002,
        "outlet_relative_humidity": 0.5,
        "moisture_removed_kg_s": 0.0,
    },
    "inside": {
        "kind": "condensing",
        "mass_flow_kg_s": 0.0047,
        "inlet_temperature_k": 416.76,
        "outlet_temperature_k": 416.7,
        "outlet_pressure_pa": 399500.0,
        "pressure_drop_pa": 500.0,
        "heat_transfer_coefficient_w_m2_k": 9000.0,
        "inlet_velocity_m_s": 3.0,
        "outlet_velocity_m_s": 0.01,
        "mass_flux_kg_m2_s": 7.0,
        "reynolds": None,
        "saturation_temperature_k": 416.76,
        "condensate_kg_s": 0.0047,
        "outlet_quality": 0.0,
        "outlet_subcooling_k": 0.0,
    },
    "overall": {
        "area_m2": 3.14,
        "coefficient_w_m2_k": 75.0,
        "coefficient_clean_w_m2_k": 75.0,
        "ua_w_k": 235.0,
        "log_mean_difference_k": 146.0,
        "mean_difference_k": 146.0,
        "crossflow_correction": 1.0,
        "effectiveness": 0.034,
        "ntu": 0.0345,
        "closest_approach_k": 143.6,
        "duty_margin_fraction": None,
        "excess_area_fraction": None,
        "resistance_shares": {
            "outside": 0.95,
            "outside_fouling": 0.0,
            "fin_bond": 0.0,
            "wall": 0.02,
            "inside_fouling": 0.0,
            "inside": 0.03,
        },
    },
    "geometry": {
        "tube_count": 20,
        "width_m": 0.5,
        "height_m": 2.0,
        "depth_m": 0.07,
        "face_area_m2": 1.0,
        "free_flow_area_m2": 0.5,
        "outside_area_m2": 3.14,
        "bare_area_m2": 3.14,
        "fin_area_m2": None,
        "inside_area_m2": 2.6,
        "inside_volume_m3": 0.0139,
        "dry_mass_kg": 45.0,
        "operating_mass_kg": None,
    },
    "wall": {
        "min_temperature_k": 409.0,
        "max_temperature_k": 416.0,
        "min_at": {"row": 1, "face": "outside"},
        "max_at": {"row": 2, "face": "inside"},
        "fin_tip_max_temperature_k": None,
    },
    "rows": [_ROW, _ROW | {"row": 2, "outside_inlet_temperature_k": 270.65}],
    "methods": [
        {
            "role": "outside_heat_transfer",
            "method": "zukauskas-1987",
            "source": "Zukauskas, Handbook of Single-Phase Convective Heat Transfer, 1987",
            "in_range": False,
            "range_note": "rows 2 is below 3",
            "scatter_fraction": 0.15,
        }
    ],
    "assumed": [
        {"pointer": "/bank/circuit/loss_coefficient", "value": 1.5, "unit": "1", "why": "common value"},
        {"pointer": "/bank/layout/side_gap_m", "value": 0.0125, "unit": "m", "why": "half the clear gap"},
    ],
    "notices": [
        {"code": "hot-surface", "severity": "caution", "text": "Surfaces can burn.", "pointer": None}
    ],
    "comparisons": [
        {
            "role": "outside_heat_transfer",
            "method": "grimison-1937",
            "in_range": True,
            "duty_w": 9500.0,
            "outside_outlet_temperature_k": 272.9,
            "inside_outlet_temperature_k": 416.7,
            "outside_pressure_drop_pa": 40.0,
            "inside_pressure_drop_pa": None,
        }
    ],
    "sensitivities": None,
    "assurance": None,
    "solve": None,
    "heat_balance_residual": 1e-12,
    "iterations": 9,
    "record": {
        "input_sha256": "a" * 64,
        "bank_sha256": "b" * 64,
        "contract": "1",
        "service_version": "0.1.0",
        "numbers": "1",
        "properties": "CoolProp 8.0.0",
    },
}


@pytest.fixture
def body() -> dict[str, Any]:
    """Give a valid rating request, free to change."""
    return copy.deepcopy(BODY)


@pytest.fixture
def result() -> dict[str, Any]:
    """Give the wire form of a rating's answer, free to change."""
    return copy.deepcopy(RESULT)
