"""Gas mixtures, flue gas, flows and states of the outside stream as plants give them, and what is said of them."""

import copy
import math
from typing import Any

import CoolProp
import msgspec
import numpy as np
import pytest
from CoolProp.CoolProp import AbstractState, HAPropsSI, PropsSI
from hypothesis import given, settings
from hypothesis import strategies as st

from crossbank.contract import RateRequest, RateResult
from crossbank_service import properties, rating
from crossbank_service.errors import CoreError, Impossible, InvalidInput

Body = dict[str, Any]

R = 8.314462618
FLUE = {
    "nitrogen": 0.62,
    "oxygen": 0.05,
    "carbon_dioxide": 0.11,
    "water": 0.2123,
    "argon": 0.0075,
    "sulfur_dioxide": 2e-4,
}
OIL = {"carbon": 0.86, "hydrogen": 0.115, "sulfur": 0.015, "oxygen": 0.005, "nitrogen": 0.003, "water": 0.002}
DRY_AIR = {"nitrogen": 0.78084, "oxygen": 0.20946, "argon": 0.00934, "carbon_dioxide": 0.00036}


def bank() -> Body:
    """Give a request: hot gas across an in-line bank with water in eight passes."""
    return {
        "bank": {
            "layout": {
                "arrangement": "inline",
                "transverse_pitch_m": 0.076,
                "longitudinal_pitch_m": 0.076,
                "rows": 8,
                "tubes_per_row": 18,
                "tube_length_m": 2.4,
            },
            "tube": {"outer_diameter_m": 0.038, "wall_thickness_m": 0.0035, "material": "carbon-steel"},
            "circuit": {"passes": 4},
        },
        "outside": {
            "fluid": {"kind": "gas-mixture", "mole_fractions": FLUE},
            "flow": {"kind": "mass", "kg_s": 9.0},
            "inlet_temperature_k": 593.15,
            "inlet_pressure_pa": 101325,
        },
        "inside": {
            "kind": "single-phase",
            "fluid": "water",
            "flow_kg_s": 8.0,
            "inlet_temperature_k": 378.15,
            "inlet_pressure_pa": 1500000,
        },
    }


def outcome(body: Body) -> RateResult | CoreError:
    """Rate one request."""
    return rating.rate([msgspec.convert(body, RateRequest)])[0]


def rated(body: Body) -> RateResult:
    """Rate one request that is sound."""
    answer = outcome(body)
    assert isinstance(answer, RateResult), answer
    return answer


def refused(body: Body) -> CoreError:
    """Rate one request that is not."""
    answer = outcome(body)
    assert isinstance(answer, CoreError)
    return answer


def codes(result: RateResult) -> set[str]:
    """Give the codes of its notices."""
    return {notice.code for notice in result.notices}


# --- mixtures ---------------------------------------------------------------------------------------------


def test_heat_given_off_is_the_mixtures_own_enthalpy() -> None:
    """Duty equals mass flow times the ideal-gas enthalpies of CoolProp's pure gases between the same ends."""
    body = bank()
    body["outside"]["fluid"]["mole_fractions"] = parts = {
        "nitrogen": 0.75,
        "carbon_dioxide": 0.15,
        "oxygen": 0.10,
    }
    result = rated(body)
    names = {"nitrogen": "Nitrogen", "carbon_dioxide": "CarbonDioxide", "oxygen": "Oxygen"}
    mass, gain = 0.0, 0.0
    for gas, y in parts.items():
        state = AbstractState("HEOS", names[gas])
        ends = []
        for t in (result.outside.outlet_temperature_k, 593.15):
            state.update(CoolProp.DmolarT_INPUTS, 1e-3, t)
            ends.append(state.hmolar())
        gain += y * (ends[1] - ends[0])
        mass += y * PropsSI("M", names[gas])
    assert -result.duty_w == pytest.approx(9.0 * gain / mass, rel=5e-4)
    assert abs(result.heat_balance_residual) < 1e-6


def test_inlet_density_is_the_ideal_gas() -> None:
    """Rho = p M/(R T) with M by hand; CoolProp's real mixture is within 0.3 % at these states."""
    body = bank()
    masses = {
        "nitrogen": 28.0134,
        "oxygen": 31.9988,
        "carbon_dioxide": 44.0095,
        "water": 18.0153,
        "argon": 39.948,
        "sulfur_dioxide": 64.0638,
    }
    molar = sum(FLUE[name] * m for name, m in masses.items()) * 1e-3
    assert rated(body).outside.inlet_density_kg_m3 == pytest.approx(101325 * molar / (R * 593.15), rel=1e-5)
    parts = {"Nitrogen": 0.6202, "Oxygen": 0.05, "CarbonDioxide": 0.11, "Water": 0.2123, "Argon": 0.0075}
    state = AbstractState("HEOS", "&".join(parts))
    state.set_mole_fractions(list(parts.values()))
    state.specify_phase(CoolProp.iphase_gas)
    state.update(CoolProp.PT_INPUTS, 101325, 593.15)
    assert rated(body).outside.inlet_density_kg_m3 == pytest.approx(state.rhomass(), rel=3e-3)


def test_coolprops_mixture_transport_is_an_average_and_no_reference() -> None:
    """The trap: its viscosity of flue gas is the mole-fraction mean of logarithms, 1 to 2 % below Wilke's rule."""
    names = {"Nitrogen": 0.74, "CarbonDioxide": 0.13, "Water": 0.13}
    state = AbstractState("HEOS", "&".join(names))
    state.set_mole_fractions(list(names.values()))
    state.specify_phase(CoolProp.iphase_gas)
    state.update(CoolProp.PT_INPUTS, 101325, 573.15)
    average = math.exp(
        sum(y * math.log(PropsSI("V", "T", 573.15, "P", 1000, name)) for name, y in names.items())
    )
    assert state.viscosity() == pytest.approx(average, rel=1e-3)
    own = properties.GasMixture.of({"nitrogen": 0.74, "carbon_dioxide": 0.13, "water": 0.13})
    wilke = own.at(np.array([573.15]), np.array([101325.0])).viscosity_pa_s[0]
    assert 0.005 < wilke / state.viscosity() - 1.0 < 0.025


def test_the_parts_of_dry_air_rate_like_air() -> None:
    """A mixture of dry air's gases rates like dry air within 1 %: the mixing rules give conductivity 1.5 % lower."""
    body = bank()
    body["outside"]["fluid"] = {"kind": "gas-mixture", "mole_fractions": DRY_AIR}
    mixed = rated(body)
    body["outside"]["fluid"] = {"kind": "moist-air", "humidity_ratio": 0.0}
    air = rated(body)
    assert mixed.duty_w == pytest.approx(air.duty_w, rel=1e-2)
    assert abs(mixed.duty_w) < abs(air.duty_w)
    assert mixed.outside.pressure_drop_pa == pytest.approx(air.outside.pressure_drop_pa, rel=2e-3)
    assert mixed.outside.outlet_humidity_ratio == 0.0


def test_a_humid_mixture_of_airs_gases_rates_like_moist_air_also_where_it_is_wet() -> None:
    """The same vapour in both forms condenses alike on a cold surface, within 1 %."""
    body = bank()
    body["outside"]["inlet_temperature_k"] = 340.0
    body["inside"]["inlet_temperature_k"] = 285.0
    w = 0.08
    y = w / (w + 0.621945)
    parts = {name: share * (1.0 - y) for name, share in DRY_AIR.items()}
    body["outside"]["fluid"] = {"kind": "gas-mixture", "mole_fractions": {**parts, "water": y}}
    mixed = rated(body)
    body["outside"]["fluid"] = {"kind": "moist-air", "humidity_ratio": w}
    air = rated(body)
    assert mixed.outside.moisture_removed_kg_s == pytest.approx(air.outside.moisture_removed_kg_s, rel=0.01)
    assert mixed.latent_duty_w == pytest.approx(air.latent_duty_w, rel=0.01)
    assert mixed.outside.outlet_humidity_ratio == pytest.approx(air.outside.outlet_humidity_ratio, rel=2e-3)
    assert (mixed.outside.moisture_removed_kg_s or 0.0) > 0.0


def test_a_mixture_of_one_gas_rates_like_the_pure_gas() -> None:
    """Nitrogen as a mixture and by name differ by what a real gas is off the ideal one: below 0.2 %."""
    body = bank()
    body["outside"]["fluid"] = {"kind": "gas-mixture", "mole_fractions": {"nitrogen": 1.0}}
    mixed = rated(body)
    body["outside"]["fluid"] = "nitrogen"
    assert mixed.duty_w == pytest.approx(rated(body).duty_w, rel=2e-3)


def test_gases_go_inside_the_tubes_too() -> None:
    """Air's gases inside give what air inside gives, within 1 %."""
    body = bank()
    body["inside"] = {
        "kind": "single-phase",
        "fluid": {"kind": "gas-mixture", "mole_fractions": DRY_AIR},
        "flow_kg_s": 1.0,
        "inlet_temperature_k": 320.0,
        "inlet_pressure_pa": 300000,
    }
    mixed = rated(body)
    body["inside"]["fluid"] = "air"
    assert mixed.duty_w == pytest.approx(rated(body).duty_w, rel=1e-2)


def test_vapour_inside_below_its_dew_point_is_said() -> None:
    """Humid gas inside against a cold stream outside is computed dry, with a notice."""
    body = bank()
    body["outside"].update({"fluid": "air", "inlet_temperature_k": 280.0})
    body["inside"] = {
        "kind": "single-phase",
        "fluid": {"kind": "gas-mixture", "mole_fractions": FLUE},
        "flow_kg_s": 1.0,
        "inlet_temperature_k": 450.0,
        "inlet_pressure_pa": 101325,
    }
    assert "gas-condenses" in codes(rated(body))
    body["inside"]["fluid"]["mole_fractions"] = DRY_AIR
    assert "gas-condenses" not in codes(rated(body))


@pytest.mark.parametrize("span", [40.0, 900.0])
def test_tabulated_and_exact_properties_rate_alike(span: float) -> None:
    """Cases between near inlets use polynomials, those between far ones the mixing rules: both close the balance."""
    body = bank()
    body["outside"]["inlet_temperature_k"] = 378.15 + span
    result = rated(body)
    assert abs(result.heat_balance_residual) < 1e-6
    assert result.duty_w < 0.0


def test_fractions_near_one_are_normalised_and_others_refused_with_their_sum() -> None:
    """0.9995 is rounding, 0.98 is a gas forgotten; the sum stands in the refusal."""
    body = bank()
    whole = rated(body).duty_w
    body["outside"]["fluid"]["mole_fractions"] = {name: y * 0.9995 for name, y in FLUE.items()}
    assert rated(body).duty_w == pytest.approx(whole, rel=1e-12)
    body["outside"]["fluid"]["mole_fractions"] = {name: y * 0.98 for name, y in FLUE.items()}
    fault = refused(body).faults[0]
    assert fault.pointer == "/outside/fluid/mole_fractions"
    assert fault.given == pytest.approx(0.98)
    assert "0.98" in fault.detail
    body["outside"]["fluid"]["mole_fractions"] = {}
    assert isinstance(refused(body), Impossible)


def test_a_mixture_below_its_dew_point_at_the_inlet_is_refused() -> None:
    """Mist is no gas; the dew point is the limit named, and it is IAPWS's saturation temperature."""
    body = bank()
    body["outside"]["inlet_temperature_k"] = 330.0
    fault = refused(body).faults[0]
    assert fault.pointer == "/outside/inlet_temperature_k"
    assert fault.at_least == pytest.approx(PropsSI("T", "P", 0.2123 * 101325, "Q", 1, "Water"), abs=0.02)


def test_gases_narrow_the_temperatures_of_a_mixture() -> None:
    """Ammonia is known to 650 K: a tenth of it bounds the mixture, a trace does not."""
    body = bank()
    body["outside"]["inlet_temperature_k"] = 700.0
    body["outside"]["fluid"]["mole_fractions"] = {"nitrogen": 0.9, "ammonia": 0.1}
    assert refused(body).faults[0].at_most == 650.0
    body["outside"]["fluid"]["mole_fractions"] = {"nitrogen": 0.995, "ammonia": 0.005}
    assert rated(body).duty_w < 0.0


def test_dense_gas_is_said_and_then_refused() -> None:
    """Carbon dioxide at 320 K: Z is 0.979 at 5 bar, 0.960 at 10 bar (said), 0.83 at 35 bar (refused) by CoolProp."""
    body = bank()
    body["outside"].update({"inlet_temperature_k": 320.0, "inlet_pressure_pa": 1e6})
    body["inside"]["inlet_temperature_k"] = 330.0
    body["outside"]["fluid"]["mole_fractions"] = {"carbon_dioxide": 1.0}
    assert PropsSI("Z", "T", 320, "P", 1e6, "CarbonDioxide") == pytest.approx(0.960, abs=1e-3)
    assert "gas-not-ideal" in codes(rated(body))
    body["outside"]["inlet_pressure_pa"] = 2e5
    assert "gas-not-ideal" not in codes(rated(body))
    body["outside"]["inlet_pressure_pa"] = 3.5e6
    assert refused(body).faults[0].pointer == "/outside/inlet_pressure_pa"


@pytest.mark.parametrize(
    ("gas", "name", "temperature", "pressure"),
    [
        ("water", "Water", 453.15, 8e5),
        ("carbon_dioxide", "CarbonDioxide", 320.0, 2e6),
        ("methane", "Methane", 300.0, 3e6),
        ("n_butane", "n-Butane", 300.0, 1e5),
        ("ammonia", "Ammonia", 300.0, 5e5),
        ("nitrogen", "Nitrogen", 300.0, 5e6),
    ],
)
def test_the_estimate_of_real_gas_follows_the_reference_equations(
    gas: str, name: str, temperature: float, pressure: float
) -> None:
    """The compressibility estimate is within 0.015 of CoolProp's where gases are rated."""
    y = np.zeros((1, len(properties.GASES)))
    y[0, properties.GASES.index(gas)] = 1.0
    z = properties.compressibility(y, np.array([temperature]), np.array([pressure]))[0]
    assert z == pytest.approx(PropsSI("Z", "T", temperature, "P", pressure, name), abs=0.015)


# --- combustion gas ---------------------------------------------------------------------------------------


def test_flue_gas_of_a_fuel_is_the_mixture_of_its_products() -> None:
    """Oil at 20 % excess air equals its element balance, worked by hand to 6 digits, given as a mixture."""
    body = bank()
    body["outside"]["fluid"] = {
        "kind": "combustion-gas",
        **OIL,
        "excess_air": 0.2,
        "air_humidity_ratio": 0.008,
    }
    fuel = rated(body)
    body["outside"]["fluid"] = {
        "kind": "gas-mixture",
        "mole_fractions": {
            "carbon_dioxide": 0.117393,
            "water": 0.105537,
            "oxygen": 0.032839,
            "sulfur_dioxide": 0.000765,
            "nitrogen": 0.734681,
            "argon": 0.008785,
        },
    }
    assert fuel.duty_w == pytest.approx(rated(body).duty_w, rel=1e-5)


def test_dry_oxygen_says_the_same_as_excess_air() -> None:
    """0.032839/(1 - 0.105537) of dry oxygen is 20 % excess air for that oil."""
    body = bank()
    body["outside"]["fluid"] = {
        "kind": "combustion-gas",
        **OIL,
        "excess_air": 0.2,
        "air_humidity_ratio": 0.008,
    }
    first = rated(body)
    body["outside"]["fluid"] = {
        "kind": "combustion-gas",
        **OIL,
        "dry_oxygen_mole_fraction": 0.032839 / (1.0 - 0.105537),
        "air_humidity_ratio": 0.008,
    }
    assert rated(body).duty_w == pytest.approx(first.duty_w, rel=1e-5)


def test_exactly_one_measure_of_the_air_is_taken() -> None:
    """None and both are refused at each member."""
    body = bank()
    for air in ({}, {"excess_air": 0.2, "dry_oxygen_mole_fraction": 0.04}):
        body["outside"]["fluid"] = {"kind": "combustion-gas", **OIL, **air}
        problem = refused(body)
        assert isinstance(problem, InvalidInput)
        assert {fault.pointer for fault in problem.faults} == {
            "/outside/fluid/excess_air",
            "/outside/fluid/dry_oxygen_mole_fraction",
        }


def test_a_fuel_that_does_not_add_up_or_burn_is_refused() -> None:
    """Ash and water count in the sum; carbon dioxide is no fuel."""
    body = bank()
    body["outside"]["fluid"] = {"kind": "combustion-gas", **OIL, "ash": 0.05, "excess_air": 0.2}
    fault = refused(body).faults[0]
    assert fault.given == pytest.approx(1.05)
    body["outside"]["fluid"] = {
        "kind": "combustion-gas",
        "carbon": 12.011 / 44.009,
        "oxygen": 31.998 / 44.009,
        "excess_air": 0.2,
    }
    assert "needs no air" in refused(body).faults[0].detail


def test_dry_combustion_air_is_listed_as_assumed() -> None:
    """The humidity of the air is a number left open; given, it is not listed."""
    body = bank()
    body["outside"]["fluid"] = {"kind": "combustion-gas", **OIL, "excess_air": 0.2}
    assert "/outside/fluid/air_humidity_ratio" in {a.pointer for a in rated(body).assumed}
    body["outside"]["fluid"]["air_humidity_ratio"] = 0.01
    assert "/outside/fluid/air_humidity_ratio" not in {a.pointer for a in rated(body).assumed}


@pytest.mark.parametrize("fuel", properties.fuel_records(), ids=lambda fuel: fuel.slug)
def test_every_typical_fuel_burns_and_rates(fuel: properties.Fuel) -> None:
    """Its fractions add to 1, it is rated, and dry flue gas without excess air holds 11 to 21 % of carbon dioxide."""
    assert sum(fuel.as_fired.values()) == pytest.approx(1.0, abs=1e-12)
    body = bank()
    body["outside"]["fluid"] = {"kind": "combustion-gas", **fuel.as_fired, "excess_air": 0.3}
    assert rated(body).duty_w < 0.0
    parts = {name: share for name, share in fuel.as_fired.items() if name != "ash"}
    y = properties.combustion_products(**parts, excess_air=0.0).mole_fractions
    assert 0.11 < y["carbon_dioxide"][0] / (1.0 - y["water"][0]) < 0.21


def test_natural_gas_needs_the_air_of_its_molecules() -> None:
    """Sum over the molecules of the oxygen each burns with, by hand: 2.035 mole of oxygen a mole of fuel."""
    moles = {"CH4": 0.95, "C2H6": 0.025, "C3H8": 0.005, "C4H10": 0.002}
    oxygen = {"CH4": 2.0, "C2H6": 3.5, "C3H8": 5.0, "C4H10": 6.5}
    mass = 0.95 * 16.043 + 0.025 * 30.07 + 0.005 * 44.097 + 0.002 * 58.124 + 0.010 * 28.0134 + 0.008 * 44.009
    air = sum(moles[m] * oxygen[m] for m in moles) / 0.20946 * 28.9647 / mass
    parts = {name: share for name, share in properties.FUELS["natural-gas"].as_fired.items() if name != "ash"}
    products = properties.combustion_products(**parts, excess_air=0.0)
    assert products.stoichiometric_air_kg_kg[0] == pytest.approx(air, rel=2e-4)


# --- flows and pressures ----------------------------------------------------------------------------------


def test_dry_mass_is_the_wet_mass_without_its_vapour() -> None:
    """8 kg/s of dry air with 0.05 kg/kg are 8.4 kg/s; of a fluid without a dry part it is refused."""
    body = bank()
    body["outside"]["fluid"] = {"kind": "moist-air", "humidity_ratio": 0.05}
    body["outside"]["flow"] = {"kind": "dry-mass", "kg_s": 8.0}
    assert rated(body).outside.mass_flow_kg_s == pytest.approx(8.4, rel=1e-14)
    for fluid in ("air", {"kind": "gas-mixture", "mole_fractions": {"water": 1.0}}):
        body["outside"]["fluid"] = fluid
        assert refused(body).faults[0].pointer == "/outside/flow/kind"


def test_dry_and_wet_reference_volumes_differ_by_the_vapour() -> None:
    """A dry normal volume is 1/(1 - y) of the wet one; in mass by hand from molar masses and 0.0224140 m3/mol."""
    body = bank()
    flow = {
        "kind": "reference-volume",
        "m3_s": 5.0,
        "reference_temperature_k": 273.15,
        "reference_pressure_pa": 101325,
        "basis": "dry",
    }
    body["outside"]["flow"] = flow
    dry = rated(body).outside.mass_flow_kg_s
    body["outside"]["flow"] = {**flow, "m3_s": 5.0 / (1.0 - 0.2123), "basis": "wet"}
    assert rated(body).outside.mass_flow_kg_s == pytest.approx(dry, rel=1e-12)
    molar = (
        0.62 * 28.0134 + 0.05 * 31.9988 + 0.11 * 44.0095 + 0.2123 * 18.0153 + 0.0075 * 39.948 + 2e-4 * 64.0638
    )
    assert dry == pytest.approx(5.0 / (1.0 - 0.2123) / 0.02241397 * molar * 1e-3, rel=1e-5)
    body["outside"]["fluid"] = {"kind": "moist-air", "humidity_ratio": 0.1}
    body["outside"]["flow"] = flow
    assert rated(body).outside.mass_flow_kg_s == pytest.approx(5.0 / 0.02241397 * 0.02896546 * 1.1, rel=1e-5)


def test_gauge_pressure_stands_on_the_atmosphere_of_the_site() -> None:
    """1500 m: 84 555.9 Pa (ASHRAE's standard atmosphere); a draught is negative; with an absolute one it is refused."""
    body = bank()
    del body["outside"]["inlet_pressure_pa"]
    body["outside"].update({"elevation_m": 1500.0, "inlet_gauge_pressure_pa": -800.0})
    result = rated(body)
    inlet = next(a for a in result.assumed if a.pointer == "/outside/inlet_pressure_pa")
    assert inlet.value == pytest.approx(84555.9 - 800.0, abs=0.5)
    body["outside"]["inlet_gauge_pressure_pa"] = -90000.0
    assert refused(body).faults[0].pointer == "/outside/inlet_gauge_pressure_pa"
    del body["outside"]["elevation_m"]
    body["outside"]["inlet_pressure_pa"] = 101325
    assert isinstance(refused(body), InvalidInput)


@pytest.mark.parametrize("elevation", [0.0, 1500.0, 4000.0])
@pytest.mark.parametrize(
    ("temperature", "wet_bulb"), [(263.15, 262.0), (303.15, 296.0), (420.0, 318.0), (600.0, 335.0)]
)
def test_wet_bulb_gives_the_humidity_of_the_energy_balance(
    temperature: float, wet_bulb: float, elevation: float
) -> None:
    """Adiabatic saturation closed with CoolProp's air, steam and water enthalpies gives the same humidity, 1 % or 1e-4.

    HAPropsSI ends at 623 K and its wet bulb fails in hot gas; so the balance is written out with pure fluids.
    """
    body = bank()
    del body["outside"]["inlet_pressure_pa"]
    body["outside"].update({"elevation_m": elevation, "inlet_temperature_k": temperature})
    body["inside"]["inlet_temperature_k"] = 370.0
    body["outside"]["fluid"] = {"kind": "moist-air", "wet_bulb_temperature_k": wet_bulb}
    p = 101325 * (1 - 2.25577e-5 * elevation) ** 5.2559
    if wet_bulb < 273.16:
        # below freezing the reference is psychrometric: HAPropsSI's own wet bulb over ice
        expected = HAPropsSI("W", "T", temperature, "B", wet_bulb, "P", p)
    else:
        p_ws = PropsSI("P", "T", wet_bulb, "Q", 1, "Water")
        ws = 0.621945 * p_ws / (p - p_ws)

        def air(t: float) -> float:
            return float(PropsSI("Hmass", "T", t, "P", 1000, "Air"))

        def vapour(t: float) -> float:
            return float(PropsSI("Hmass", "T", t, "Dmass", 1e-5, "Water"))

        water = float(PropsSI("Hmass", "T", wet_bulb, "Q", 0, "Water"))
        top = ws * (vapour(wet_bulb) - water) - (air(temperature) - air(wet_bulb))
        expected = top / (vapour(temperature) - water)
    result = rated(body)
    assert result.outside.outlet_humidity_ratio is not None
    inlet = result.outside.outlet_humidity_ratio + (result.outside.moisture_removed_kg_s or 0.0) / 9.0
    assert inlet == pytest.approx(expected, rel=0.01, abs=1e-4)


# --- what is said -----------------------------------------------------------------------------------------


def test_metal_below_the_acid_dew_point_is_said_and_its_assumption_listed() -> None:
    """200 ppm of sulfur dioxide over 105 C water: below the dew point by Verhoff and Banchero; without it nothing."""
    body = bank()
    result = rated(body)
    notice = next(n for n in result.notices if n.code == "surface-below-acid-dew-point")
    assert notice.severity == "caution"
    share = next(a for a in result.assumed if a.pointer == "/outside/fluid")
    assert share.value == 0.02
    dew = properties.acid_dew_point(0.2123, 0.02 * 2e-4, 101325)
    assert result.wall.min_temperature_k is not None
    assert result.wall.min_temperature_k < dew
    body["inside"]["inlet_temperature_k"] = 440.0
    assert "surface-below-acid-dew-point" not in codes(rated(body))
    body["inside"]["inlet_temperature_k"] = 378.15
    body["outside"]["fluid"]["mole_fractions"] = {**FLUE, "sulfur_dioxide": 0.0, "nitrogen": 0.6202}
    clean = rated(body)
    assert "surface-below-acid-dew-point" not in codes(clean)
    assert not [a for a in clean.assumed if a.pointer == "/outside/fluid"]


def test_lumped_rating_says_that_the_surface_was_computed_dry() -> None:
    """Flue gas over 30 C water is below its water dew point; the closed relation computes no condensate."""
    body = bank()
    body["inside"]["inlet_temperature_k"] = 303.15
    body["detail"] = {"resolution": "bank"}
    assert "surface-below-dew-point" in codes(rated(body))
    body["inside"]["inlet_temperature_k"] = 378.15
    assert "surface-below-dew-point" not in codes(rated(body))


@pytest.mark.parametrize(("temperature", "said"), [(690.0, False), (710.0, True)])
def test_radiation_of_hot_flue_gas_is_said_above_700_k(temperature: float, said: bool) -> None:
    """From 700 K on with water or carbon dioxide; nitrogen never radiates."""
    body = bank()
    body["outside"]["inlet_temperature_k"] = temperature
    assert ("gas-radiation-ignored" in codes(rated(body))) is said
    body["outside"]["fluid"] = {"kind": "moist-air", "humidity_ratio": 0.05}
    assert ("gas-radiation-ignored" in codes(rated(body))) is said
    body["outside"]["fluid"] = {"kind": "gas-mixture", "mole_fractions": {"nitrogen": 1.0}}
    assert "gas-radiation-ignored" not in codes(rated(body))


def test_buoyancy_is_said_where_grashof_over_reynolds_squared_passes_0_3() -> None:
    """One row at a held surface: g (dT/T) d/u2 by hand from the answer's own states, on both sides of 0.3."""
    body = bank()
    body["bank"]["layout"].update({"rows": 1})
    body["bank"]["circuit"] = {"passes": 1}
    body["inside"] = {"kind": "held-surface", "temperature_k": 400.0}
    body["outside"].update({"fluid": "nitrogen", "inlet_temperature_k": 300.0})
    seen = set()
    for flow in (0.5, 0.9, 1.0, 1.2, 2.0):
        body["outside"]["flow"] = {"kind": "mass", "kg_s": flow}
        result = rated(body)
        bulk = 0.5 * (300.0 + result.outside.outlet_temperature_k)
        velocity = result.outside.max_velocity_m_s
        ratio = 9.80665 / bulk * (400.0 - bulk) * 0.038 / velocity**2
        assert ("buoyancy" in codes(result)) is (ratio > 0.3), ratio
        seen.add(ratio > 0.3)
    assert seen == {True, False}


# --- arrays and corners -----------------------------------------------------------------------------------


def test_a_case_does_not_depend_on_the_mixtures_beside_it() -> None:
    """Bit for bit: alone, and in one array with a mixture that holds other gases."""
    other = bank()
    other["outside"]["fluid"]["mole_fractions"] = {"methane": 0.5, "hydrogen": 0.3, "ammonia": 0.2}
    requests = [msgspec.convert(b, RateRequest) for b in (other, bank(), other)]
    beside = rating.rate(requests)[1]
    assert msgspec.json.encode(beside) == msgspec.json.encode(rated(bank()))


def test_a_dry_case_does_not_depend_on_wet_ones_beside_it() -> None:
    """Bit for bit: hot humid gas alone, and next to the same gas over cold water."""
    wet, dry = bank(), bank()
    wet["outside"]["inlet_temperature_k"] = 350.0
    wet["inside"]["inlet_temperature_k"] = 300.0
    assert rated(wet).latent_duty_w < 0.0
    requests = [msgspec.convert(b, RateRequest) for b in (wet, dry, wet)]
    assert msgspec.json.encode(rating.rate(requests)[1]) == msgspec.json.encode(rated(dry))


@st.composite
def mixtures(draw: st.DrawFn) -> Body:
    """Any mixture within the limits, from nothing but vapour to none, at any pressure rated."""
    raw = {gas: draw(st.floats(0.0, 1.0)) for gas in properties.GASES}
    keep = draw(st.sets(st.sampled_from(properties.GASES), min_size=1))
    raw = {gas: (y if gas in keep else 0.0) for gas, y in raw.items()}
    total = sum(raw.values())
    if total < 1e-3:
        raw, total = {"nitrogen": 1.0}, 1.0
    body = bank()
    body["outside"]["fluid"]["mole_fractions"] = {gas: y / total for gas, y in raw.items()}
    body["outside"]["inlet_temperature_k"] = draw(st.floats(200.0, 1800.0))
    body["outside"]["inlet_pressure_pa"] = draw(st.floats(2e4, 3e5))
    body["outside"]["flow"] = {"kind": "approach-velocity", "m_s": draw(st.floats(0.3, 8.0))}
    # far below boiling, which is no matter of the gas
    body["inside"].update({"flow_kg_s": 20.0, "inlet_pressure_pa": 1.5e7})
    body["inside"]["inlet_temperature_k"] = draw(st.floats(280.0, 440.0))
    body["detail"] = {"resolution": draw(st.sampled_from(["row", "bank"]))}
    return body


def numbers(value: Any) -> list[float]:
    """Give every number of an answer."""
    if isinstance(value, dict):
        return [n for member in value.values() for n in numbers(member)]
    if isinstance(value, list):
        return [n for member in value for n in numbers(member)]
    return [value] if isinstance(value, float) else []


@settings(max_examples=120, deadline=None)
@given(mixtures())
def test_any_mixture_is_rated_in_finite_numbers_or_refused(body: Body) -> None:
    """Whatever the gas: an answer without a number that is none and with a closed balance, or a reason."""
    answer = outcome(body)
    if isinstance(answer, CoreError):
        assert isinstance(answer, Impossible), answer
        return
    assert all(math.isfinite(n) for n in numbers(msgspec.to_builtins(answer)))
    assert abs(answer.heat_balance_residual) < 1e-6


@settings(max_examples=60, deadline=None)
@given(
    st.fixed_dictionaries(
        {name: st.floats(0.0, 1.0) for name in ("carbon", "hydrogen", "sulfur", "oxygen", "water", "ash")}
    ),
    st.one_of(
        st.tuples(st.just("excess_air"), st.floats(0.0, 100.0)),
        st.tuples(st.just("dry_oxygen_mole_fraction"), st.floats(0.0, 0.2)),
    ),
    st.floats(0.0, 0.1),
)
def test_any_fuel_is_rated_in_finite_numbers_or_refused(
    fuel: dict[str, float], air: tuple[str, float], humidity: float
) -> None:
    """Fuels from graphite to wet ash, from no excess air to a hundredfold."""
    total = sum(fuel.values())
    parts = {name: share / total for name, share in fuel.items()} if total > 1e-6 else {"carbon": 1.0}
    body = bank()
    body["outside"]["fluid"] = {
        "kind": "combustion-gas",
        **parts,
        air[0]: air[1],
        "air_humidity_ratio": humidity,
    }
    answer = outcome(body)
    if isinstance(answer, CoreError):
        assert isinstance(answer, Impossible), answer
        return
    assert all(math.isfinite(n) for n in numbers(msgspec.to_builtins(answer)))


def test_the_callers_metal_may_carry_what_checks_need_without_changing_the_rating() -> None:
    """Modulus, expansion, yield and limit are accepted as numbers or curves; the answer stays the same."""
    body = bank()
    plain = {"name": "house steel", "conductivity_w_m_k": 50.0, "density_kg_m3": 7850.0}
    body["bank"]["tube"]["material"] = plain
    first = rated(body)
    rich = copy.deepcopy(body)
    rich["bank"]["tube"]["material"] = {
        **plain,
        "elastic_modulus_pa": {"temperature_k": [293.15, 673.15], "value": [2.02e11, 1.71e11]},
        "expansion_per_k": 1.21e-5,
        "yield_stress_pa": {"temperature_k": [293.15, 573.15], "value": [235e6, 150e6]},
        "max_temperature_k": 723.15,
    }
    second = rated(rich)
    assert second.duty_w == first.duty_w
    assert second.record.bank_sha256 != first.record.bank_sha256
    rich["bank"]["tube"]["material"]["expansion_per_k"] = {"temperature_k": [300.0, 400.0], "value": [1e-5]}
    assert refused(rich).faults[0].pointer == "/bank/tube/material/expansion_per_k/value"
