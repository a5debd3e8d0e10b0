"""Combustion products and dew points."""

import numpy as np
import pytest

from crossbank_service.properties import acid_dew_point, combustion_products, water_dew_point

OIL = {"carbon": 0.86, "hydrogen": 0.115, "sulfur": 0.015, "oxygen": 0.005, "nitrogen": 0.003, "water": 0.002}


def test_methane_burns_to_the_textbook_reaction() -> None:
    """CH4 + 2 O2: stoichiometric flue holds water and carbon dioxide two to one and no oxygen."""
    c, h = 12.011 / 16.043, 4.032 / 16.043
    products = combustion_products(carbon=c, hydrogen=h, excess_air=0.0)
    y = products.mole_fractions
    air_moles = 2.0 / 0.20946
    carbon_dioxide = 1.0 + 0.00036 * air_moles
    assert y["water"][0] / y["carbon_dioxide"][0] == pytest.approx(2.0 / carbon_dioxide, rel=1e-10)
    assert y["oxygen"][0] == pytest.approx(0.0, abs=1e-15)
    assert products.stoichiometric_air_kg_kg[0] == pytest.approx(air_moles * 28.9647 / 16.043, rel=1e-10)


def test_mass_is_conserved() -> None:
    """Flue gas weighs fuel plus humid air, within the rounding of the molar masses; ash stays behind."""
    products = combustion_products(**OIL, excess_air=[0.0, 0.2, 1.0], air_humidity_ratio=0.008)
    air = products.stoichiometric_air_kg_kg * (1.0 + products.excess_air)
    assert np.allclose(products.flue_gas_kg_kg, 1.0 + air * 1.008, rtol=1e-4)


def test_mole_fractions_add_to_one() -> None:
    """Every case's composition is complete."""
    products = combustion_products(**OIL, excess_air=[0.0, 0.2, 1.0])
    assert np.allclose(sum(products.mole_fractions.values()), 1.0, rtol=1e-14)
    medium = products.mixture()
    assert np.allclose(medium.molar_mass_kg_mol, products.molar_mass_kg_mol, rtol=1e-14)


def test_dry_oxygen_inverts_excess_air() -> None:
    """The oxygen of the dried flue gas brings back the excess air."""
    excess = np.array([0.0, 0.05, 0.3, 1.5])
    y = combustion_products(**OIL, excess_air=excess, air_humidity_ratio=0.01).mole_fractions
    dry = y["oxygen"] / (1.0 - y["water"])
    back = combustion_products(**OIL, dry_oxygen_mole_fraction=dry, air_humidity_ratio=0.01)
    assert np.allclose(back.excess_air, excess, atol=1e-12)


def test_exactly_one_measure_of_air_is_taken() -> None:
    """Both or neither of excess air and dry oxygen is refused."""
    with pytest.raises(ValueError, match="either"):
        combustion_products(carbon=0.8)
    with pytest.raises(ValueError, match="either"):
        combustion_products(carbon=0.8, excess_air=0.1, dry_oxygen_mole_fraction=0.03)


def test_acid_dew_point_of_the_published_pressures() -> None:
    """76 mmHg of water and 0.0076 mmHg of acid: 410.45 K by Verhoff and Banchero's equation, by hand."""
    t = acid_dew_point(0.1, 1e-5, 760.0 * 133.322)
    assert float(t) == pytest.approx(410.45, abs=0.01)


def test_without_acid_the_water_dew_point_rules() -> None:
    """No SO3, or too little to matter, gives the water dew point."""
    water = float(water_dew_point(0.1, 101325.0))
    assert water == pytest.approx(319.22, abs=0.05)
    assert float(acid_dew_point(0.1, 0.0, 101325.0)) == water
    assert float(acid_dew_point(0.1, 1e-25, 101325.0)) >= water
