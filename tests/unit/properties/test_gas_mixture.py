"""Low-density gases: pure values, mixing rules, humid air."""

import CoolProp
import numpy as np
import pytest
from CoolProp.CoolProp import AbstractState

from crossbank_service.properties import GASES, GasMixture, MoistAir
from crossbank_service.properties._gas_data import DRY_AIR, SPECIES

R = 8.314462618
FITTED = {
    "nitrogen": ("Nitrogen", 1.4e-4, 5e-4),
    "oxygen": ("Oxygen", 2.2e-4, 5e-4),
    "carbon_dioxide": ("CarbonDioxide", 2.0e-4, 5e-4),
    "argon": ("Argon", 1e-5, 5e-4),
    "helium": ("Helium", 1e-5, 2e-5),
    "hydrogen": ("Hydrogen", 1e-4, 2e-4),
    "methane": ("Methane", 5e-5, 1.2e-3),
    "ethane": ("Ethane", 1e-4, 2e-3),
    "propane": ("n-Propane", 2e-4, 5e-5),
    "n_butane": ("n-Butane", 2e-4, 5e-5),
    "ammonia": ("Ammonia", 1e-6, 1.2e-3),
    "air": ("Air", 3e-4, 5e-4),
}


@pytest.mark.parametrize("slug", FITTED)
def test_fits_repeat_the_reference_equations_within_the_stated_error(slug: str) -> None:
    """Heat capacity and transport equal CoolProp's zero-density values over the fitted range."""
    name, cp_error, transport_error = FITTED[slug]
    species = DRY_AIR if slug == "air" else SPECIES[slug]
    reference = AbstractState("HEOS", name)
    low = max(species.low_k, 200.0)
    for t in np.linspace(low, min(species.high_k, 1500.0), 60):
        reference.update(CoolProp.DmolarT_INPUTS, 1e-3, t)
        mu, k = species.transport(np.array([t]))
        cp = species.heat_capacity.over_r(np.array([t]))[0] * R
        assert cp == pytest.approx(reference.cp0molar(), rel=cp_error)
        assert mu[0] == pytest.approx(reference.viscosity(), rel=transport_error)
        assert k[0] == pytest.approx(reference.conductivity(), rel=transport_error)


def test_steam_equals_the_iapws_equations_at_zero_density() -> None:
    """Steam's transport equals CoolProp's IAPWS equations at vanishing density."""
    reference = AbstractState("HEOS", "Water")
    for t in np.linspace(280.0, 1100.0, 30):
        reference.update(CoolProp.DmolarT_INPUTS, 1e-4, t)
        mu, k = SPECIES["water"].transport(np.array([t]))
        assert mu[0] == pytest.approx(reference.viscosity(), rel=1e-5)
        assert k[0] == pytest.approx(reference.conductivity(), rel=1e-4)
        cp = SPECIES["water"].heat_capacity.over_r(np.array([t]))[0] * R
        assert cp == pytest.approx(reference.cp0molar(), rel=6e-5)


@pytest.mark.parametrize(
    ("temperature", "viscosity", "conductivity"),
    [(300.0, 17.5e-6, 25.0e-3), (500.0, 25.4e-6, 38.1e-3), (800.0, 34.3e-6, 55.5e-3)],
)
def test_carbon_monoxide_is_near_the_handbook(
    temperature: float, viscosity: float, conductivity: float
) -> None:
    """Carbon monoxide agrees with Incropera and DeWitt, table A.4 (from memory), within 4 %."""
    mu, k = SPECIES["carbon_monoxide"].transport(np.array([temperature]))
    assert mu[0] == pytest.approx(viscosity, rel=0.04)
    assert k[0] == pytest.approx(conductivity, rel=0.04)


def test_sulfur_dioxide_is_near_the_handbook() -> None:
    """Sulfur dioxide at 300 K is near the CRC Handbook's values (from memory)."""
    mu, k = SPECIES["sulfur_dioxide"].transport(np.array([300.0]))
    assert mu[0] == pytest.approx(12.9e-6, rel=0.01)
    assert k[0] == pytest.approx(0.0096, rel=0.08)


@pytest.mark.parametrize("slug", GASES)
def test_a_mixture_of_one_gas_is_that_gas(slug: str) -> None:
    """The mixing rules leave a pure gas unchanged."""
    t = np.array([[300.0, 700.0]])
    state = GasMixture.of({slug: 1.0}).at(t, np.array(1e5))
    mu, k = SPECIES[slug].transport(t)
    assert np.allclose(state.viscosity_pa_s, mu, rtol=1e-14)
    assert np.allclose(state.conductivity_w_m_k, k, rtol=1e-14)
    density = 1e5 * SPECIES[slug].molar_mass_kg_mol / (R * t)
    assert np.allclose(state.density_kg_m3, density, rtol=1e-14)


def test_splitting_a_gas_in_two_portions_changes_nothing() -> None:
    """Wilke's and Mason and Saxena's rules are blind to labels: equal gases mix to themselves."""
    from crossbank_service.properties import ideal_mixture  # noqa: PLC0415

    t, p = np.array([400.0]), np.array([1e5])
    n2, co2 = SPECIES["nitrogen"], SPECIES["carbon_dioxide"]
    whole = ideal_mixture.state([(n2, np.array([0.6])), (co2, np.array([0.4]))], t, p)
    split = ideal_mixture.state(
        [(n2, np.array([0.25])), (co2, np.array([0.4])), (n2, np.array([0.35]))], t, p
    )
    assert split.viscosity_pa_s[0] == pytest.approx(whole.viscosity_pa_s[0], rel=1e-13)
    assert split.conductivity_w_m_k[0] == pytest.approx(whole.conductivity_w_m_k[0], rel=1e-13)


def test_binary_mixture_equals_the_formulas_by_hand() -> None:
    """A nitrogen and carbon dioxide mixture equals Wilke's formula written out with scalars."""
    t = 500.0
    (mu1,), (k1,) = SPECIES["nitrogen"].transport(np.array([t]))
    (mu2,), (k2,) = SPECIES["carbon_dioxide"].transport(np.array([t]))
    m1, m2, y1, y2 = 28.0134, 44.0095, 0.7, 0.3
    phi12 = (1 + (mu1 / mu2) ** 0.5 * (m2 / m1) ** 0.25) ** 2 / (8 * (1 + m1 / m2)) ** 0.5
    phi21 = (1 + (mu2 / mu1) ** 0.5 * (m1 / m2) ** 0.25) ** 2 / (8 * (1 + m2 / m1)) ** 0.5
    state = GasMixture.of({"nitrogen": y1, "carbon_dioxide": y2}).at(np.array([t]), np.array(1e5))
    mu = y1 * mu1 / (y1 + y2 * phi12) + y2 * mu2 / (y2 + y1 * phi21)
    k = y1 * k1 / (y1 + y2 * phi12) + y2 * k2 / (y2 + y1 * phi21)
    assert state.viscosity_pa_s[0] == pytest.approx(mu, rel=1e-12)
    assert state.conductivity_w_m_k[0] == pytest.approx(k, rel=1e-12)


def test_dry_moist_air_agrees_with_the_real_gas() -> None:
    """Moist air without moisture agrees with CoolProp's air at 1 bar within 0.2 % (0.5 % at 200 K)."""
    reference = AbstractState("HEOS", "Air")
    for t in (200.0, 250.0, 300.0, 400.0, 700.0, 1200.0):
        reference.update(CoolProp.PT_INPUTS, 1e5, t)
        state = MoistAir(np.array([0.0])).at(np.array([t]), np.array(1e5))
        tolerance = 8e-3 if t < 280.0 else 2.5e-3
        assert state.density_kg_m3[0] == pytest.approx(reference.rhomass(), rel=tolerance)
        assert state.heat_capacity_j_kg_k[0] == pytest.approx(reference.cpmass(), rel=tolerance)
        assert state.viscosity_pa_s[0] == pytest.approx(reference.viscosity(), rel=tolerance)
        assert state.conductivity_w_m_k[0] == pytest.approx(reference.conductivity(), rel=tolerance)


def test_moist_air_agrees_with_the_humid_air_library_at_room_temperature() -> None:
    """At 293.15 K, where its transport still holds, CoolProp's humid air agrees within 1 %."""
    from CoolProp.HumidAirProp import HAPropsSI  # noqa: PLC0415

    w = 0.01
    given = ("T", 293.15, "P", 101325.0, "W", w)
    state = MoistAir(np.array([w])).at(np.array([293.15]), np.array(101325.0))
    # its heat capacity and volume are per kg of dry air
    assert state.heat_capacity_j_kg_k[0] == pytest.approx(HAPropsSI("C", *given) / (1 + w), rel=2e-3)
    assert state.density_kg_m3[0] == pytest.approx((1 + w) / HAPropsSI("V", *given), rel=1e-3)
    assert state.viscosity_pa_s[0] == pytest.approx(HAPropsSI("M", *given), rel=0.01)
    assert state.conductivity_w_m_k[0] == pytest.approx(HAPropsSI("K", *given), rel=0.01)


def test_unknown_gas_is_refused_with_the_known_ones() -> None:
    """A name that is no gas of the mixture is refused, naming it and what there is."""
    with pytest.raises(KeyError, match=r"phlogiston.*nitrogen"):
        GasMixture.of({"phlogiston": 1.0})


def test_mole_fractions_are_normalised() -> None:
    """Fractions that add to 2 mean the same as their halves."""
    one = GasMixture.of({"nitrogen": 0.79, "oxygen": 0.21})
    two = GasMixture.of({"nitrogen": 1.58, "oxygen": 0.42})
    assert np.allclose(one.mole_fractions, two.mole_fractions, rtol=1e-15)
