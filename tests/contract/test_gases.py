"""Gases, flows and states as plants give them, over the interface; and what the catalogues say of them."""

import copy
from typing import Any

import httpx
import pytest
from CoolProp.CoolProp import HAPropsSI

from crossbank_service.http.examples import examples
from crossbank_service.properties import GASES

Body = dict[str, Any]


@pytest.fixture
def heater() -> Body:
    """Give a heater whose tubes are warmer than any dew point asked for."""
    body: Body = copy.deepcopy(examples()["veneer-dryer-heater"])
    body["inside"] = {"kind": "held-surface", "temperature_k": 430.0}
    body["outside"].update({"flow": {"kind": "mass", "kg_s": 4.0}, "inlet_temperature_k": 350.0})
    return body


@pytest.mark.parametrize("elevation", [-400.0, 0.0, 2500.0, 4500.0, 9000.0])
@pytest.mark.parametrize(
    ("temperature", "dew_point"),
    [(250.0, 245.0), (300.0, 288.0), (450.0, 310.0), (600.0, 290.0), (600.0, 320.0)],
)
def test_dew_point_inputs_hold_to_600_k_and_at_any_altitude(
    service: httpx.Client, heater: Body, temperature: float, dew_point: float, elevation: float
) -> None:
    """The humidity is HAPropsSI's within 1.5 % (it has the enhancement factor, this service does not)."""
    outside = heater["outside"]
    outside["fluid"] = {"kind": "moist-air", "dew_point_temperature_k": dew_point}
    outside["inlet_temperature_k"], outside["elevation_m"] = temperature, elevation
    del outside["inlet_pressure_pa"]
    answer = service.post("/v1/rate", json=heater)
    assert answer.status_code == 200, answer.text
    p = 101325 * (1 - 2.25577e-5 * elevation) ** 5.2559
    expected = HAPropsSI("W", "T", max(temperature, dew_point), "D", dew_point, "P", p)
    assert answer.json()["outside"]["outlet_humidity_ratio"] == pytest.approx(expected, rel=0.015)


@pytest.mark.parametrize("elevation", [-400.0, 0.0, 2500.0, 4500.0, 9000.0])
@pytest.mark.parametrize(
    ("temperature", "humidity"), [(300.0, 0.008), (450.0, 0.05), (600.0, 0.02), (600.0, 0.3)]
)
def test_wet_bulb_inputs_hold_to_600_k_and_at_any_altitude(
    service: httpx.Client, heater: Body, temperature: float, humidity: float, elevation: float
) -> None:
    """The wet bulb HAPropsSI finds for a humidity brings that humidity back, within 0.8 % of saturation there.

    That much is the enhancement factor, which HAPropsSI has and this service leaves out.
    """
    p = 101325 * (1 - 2.25577e-5 * elevation) ** 5.2559
    wet_bulb = HAPropsSI("B", "T", temperature, "W", humidity, "P", p)
    saturated = HAPropsSI("W", "T", wet_bulb, "R", 1.0, "P", p)
    outside = heater["outside"]
    outside["fluid"] = {"kind": "moist-air", "wet_bulb_temperature_k": wet_bulb}
    outside["inlet_temperature_k"], outside["elevation_m"] = temperature, elevation
    del outside["inlet_pressure_pa"]
    answer = service.post("/v1/rate", json=heater)
    assert answer.status_code == 200, answer.text
    assert answer.json()["outside"]["outlet_humidity_ratio"] == pytest.approx(humidity, abs=0.008 * saturated)


def test_the_catalogue_lists_gases_fuels_and_families(service: httpx.Client) -> None:
    """Every gas of a mixture with its limits, every fuel marked as typical with its source, the families beside."""
    found = service.get("/v1/fluids").json()
    assert tuple(gas["name"] for gas in found["gases"]) == GASES
    assert all(gas["min_temperature_k"] < gas["max_temperature_k"] for gas in found["gases"])
    assert {"moist-air", "gas-mixture", "combustion-gas"} <= {fluid["kind"] for fluid in found["fluids"]}
    assert {"natural-gas", "light-fuel-oil", "wood-chips-wet", "bark"} <= {f["slug"] for f in found["fuels"]}
    for fuel in found["fuels"]:
        assert fuel["typical"] is True
        assert fuel["source"]
        assert fuel["doubt"]
        assert sum(fuel["as_fired"].values()) == pytest.approx(1.0, abs=1e-9)


def test_a_listed_fuel_can_be_pasted_into_a_request(service: httpx.Client) -> None:
    """`as_fired` is the body of a combustion gas but for the air."""
    body = copy.deepcopy(examples()["boiler-house-economiser"])
    for fuel in service.get("/v1/fluids").json()["fuels"]:
        body["outside"]["fluid"] = {
            "kind": "combustion-gas",
            **fuel["as_fired"],
            "dry_oxygen_mole_fraction": 0.05,
        }
        answer = service.post("/v1/rate", json=body)
        assert answer.status_code == 200, answer.text
        assert answer.json()["outside"]["outlet_humidity_ratio"] > 0.02


def test_materials_carry_their_mechanics_with_source_and_doubt(service: httpx.Client) -> None:
    """Curves run side by side; carbon steel is near the 210 GPa and 12e-6 of EN 1993-1-2 (from memory)."""
    found = {m["slug"]: m for m in service.get("/v1/materials").json()["materials"]}
    for metal in found.values():
        assert metal["source"]
        for name in ("elastic_modulus_pa", "expansion_per_k"):
            curve = metal[name]
            if curve is not None:
                assert len(curve["temperature_k"]) == len(curve["value"]) > 1
                assert metal["mechanical_source"]
    steel = found["carbon-steel"]
    assert steel["elastic_modulus_pa"]["value"][0] == pytest.approx(210e9, rel=0.05)
    assert steel["expansion_per_k"]["value"][0] == pytest.approx(12e-6, rel=0.05)
    assert steel["density_kg_m3"] == pytest.approx(7850.0)
    assert found["aluminium"]["expansion_per_k"]["value"][0] == pytest.approx(23.6e-6, rel=0.02)


def test_wrong_sums_and_percent_are_told(service: httpx.Client) -> None:
    """422 with the sum; mole fractions in percent break their bounds and are called percent."""
    body = copy.deepcopy(examples()["boiler-house-economiser"])
    body["outside"]["fluid"]["mole_fractions"] = {"nitrogen": 0.7, "water": 0.2}
    problem = service.post("/v1/rate", json=body).json()
    assert (problem["status"], problem["code"]) == (422, "impossible")
    assert problem["errors"][0]["given"] == pytest.approx(0.9)
    body["outside"]["fluid"]["mole_fractions"] = {"nitrogen": 80.0, "water": 20.0}
    problem = service.post("/v1/rate", json=body).json()
    assert "percent" in problem["errors"][0]["detail"]
    body["outside"]["fluid"]["mole_fractions"] = {"nitrogen": 0.8, "steam": 0.2}
    assert (
        service.post("/v1/rate", json=body).json()["errors"][0]["pointer"].endswith("/mole_fractions/steam")
    )
