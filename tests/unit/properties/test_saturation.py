"""Saturated fluids against their reference equations."""

import CoolProp
import numpy as np
import pytest
from CoolProp.CoolProp import AbstractState
from iapws import IAPWS97

from crossbank_service.properties import FLUIDS, PureSinglePhase, Saturation

CONDENSABLE = [slug for slug, f in FLUIDS.items() if not f.supercritical_only]


@pytest.mark.parametrize("slug", CONDENSABLE)
def test_saturated_properties_repeat_the_reference_equations(slug: str) -> None:
    """Random pressures over the whole line within the stated errors."""
    saturation = Saturation(slug)
    reference = AbstractState("HEOS", FLUIDS[slug].equation)
    low, high = saturation.temperature_limits_k
    t = np.random.default_rng(3).uniform(low, high, 40)
    p = []
    rows = []
    for one in t:
        row = []
        for quality in (0.0, 1.0):
            reference.update(CoolProp.QT_INPUTS, quality, one)
            row += [reference.rhomass(), reference.cpmass(), reference.hmass()]
            for read in (reference.viscosity, reference.conductivity):
                try:
                    row.append(read())
                except ValueError:
                    row.append(np.nan)
        p.append(reference.p())
        # water follows IAPWS R1-76 instead; see the test against the industrial formulation
        tension = saturation.at(np.array([p[-1]])).surface_tension_n_m if slug == "water" else None
        rows.append([*row, reference.surface_tension() if tension is None else tension[0]])
    r = np.array(rows).T
    state = saturation.at(np.array(p))
    assert np.all(np.abs(state.temperature_k - t) < 1e-6)
    assert np.allclose(saturation.pressure(t), p, rtol=1e-7)
    latent = r[7] - r[2]
    assert np.allclose(state.latent_heat_j_kg, latent, rtol=1e-6)
    assert np.all(np.abs(state.liquid_enthalpy_j_kg - r[2]) < 1e-6 * latent)
    assert state.surface_tension_n_m is not None
    pairs = (
        (state.liquid_density_kg_m3, r[0], 1e-6),
        (state.liquid_heat_capacity_j_kg_k, r[1], 1e-5),
        (state.liquid_viscosity_pa_s, r[3], 1e-5),
        (state.liquid_conductivity_w_m_k, r[4], 2e-4),
        (state.vapour_density_kg_m3, r[5], 1e-6),
        (state.vapour_heat_capacity_j_kg_k, r[6], 1e-5),
        (state.vapour_viscosity_pa_s, r[8], 1e-5),
        (state.vapour_conductivity_w_m_k, r[9], 2e-4),
        (state.surface_tension_n_m, r[10], 1e-6),
    )
    for ours, theirs, tolerance in pairs:
        known = ~np.isnan(theirs)
        assert np.allclose(ours[known], theirs[known], rtol=tolerance)


@pytest.mark.parametrize("pressure", [1e4, 101325.0, 5e5, 2e6, 8e6])
def test_steam_agrees_with_the_industrial_formulation(pressure: float) -> None:
    """Saturated water agrees with an independent coding of IAPWS-IF97."""
    liquid, vapour = IAPWS97(P=pressure * 1e-6, x=0), IAPWS97(P=pressure * 1e-6, x=1)
    state = Saturation("water").at(np.array([pressure]))
    assert state.temperature_k[0] == pytest.approx(liquid.T, abs=0.01)
    assert state.latent_heat_j_kg[0] == pytest.approx((vapour.h - liquid.h) * 1e3, rel=3e-4)
    assert state.vapour_density_kg_m3[0] == pytest.approx(vapour.rho, rel=3e-4)
    assert state.liquid_viscosity_pa_s[0] == pytest.approx(liquid.mu, rel=1e-3)
    assert state.liquid_conductivity_w_m_k[0] == pytest.approx(liquid.k, rel=1e-3)
    assert state.surface_tension_n_m is not None
    assert state.surface_tension_n_m[0] == pytest.approx(liquid.sigma, rel=3e-4)


def test_saturated_vapour_continues_the_gas() -> None:
    """Vapour on the line equals the gas at the same state, so condensing joins superheat without a step."""
    for slug in ("water", "ammonia", "r134a"):
        saturation, gas = Saturation(slug), PureSinglePhase(slug, "gas")
        p = np.array([1e5, 5e5, 2e6])
        state = saturation.at(p)
        same = gas.at(state.temperature_k, p)
        assert np.allclose(same.density_kg_m3, state.vapour_density_kg_m3, rtol=1e-5)
        h = gas.enthalpy(state.temperature_k, p)
        assert np.all(np.abs(h - state.vapour_enthalpy_j_kg) < 1e-5 * state.latent_heat_j_kg)


def test_pressures_outside_the_line_hold_the_end_values() -> None:
    """Beyond both ends everything stays finite and at the end of the table."""
    saturation = Saturation("water")
    low, high = saturation.pressure_limits_pa
    state = saturation.at(np.array([0.5 * low, low, high, 10.0 * high]))
    assert state.temperature_k[0] == state.temperature_k[1]
    assert state.temperature_k[2] == state.temperature_k[3]
    assert np.all(np.isfinite(state.latent_heat_j_kg))
    assert np.all(state.latent_heat_j_kg > 0.0)


def test_hydrocarbons_are_marked() -> None:
    """Propane is a hydrocarbon; ammonia is not."""
    assert Saturation("propane").hydrocarbon
    assert not Saturation("ammonia").hydrocarbon


def test_gas_only_fluids_do_not_condense() -> None:
    """Nitrogen is refused with the fluids that condense."""
    with pytest.raises(KeyError, match=r"gas only.*ammonia"):
        Saturation("nitrogen")
