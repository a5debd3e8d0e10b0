"""Single-phase flow in tubes: joins, limits, wall factors and an independent library."""

import fluids
import ht
import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from crossbank_service.methods.inside_single_phase import (
    churchill_1977,
    colebrook_1939,
    friction_gradient,
    friction_wall_factor,
    fully_rough_friction_factor,
    gnielinski_1976,
    gnielinski_1976_constant_flux,
    haaland_1983,
    laminar_nusselt,
    laminar_nusselt_constant_flux,
    return_bend_loss,
    smooth_friction_factor,
    turbulent_nusselt,
)


def _decades(low: float, high: float) -> st.SearchStrategy[float]:
    return st.floats(low, high).map(lambda power: 10.0**power)


@pytest.mark.parametrize("reynolds", [5e3, 3e4, 1e6])
@pytest.mark.parametrize("prandtl", [0.7, 6.0, 300.0])
def test_turbulent_core_agrees_with_a_public_library(reynolds: float, prandtl: float) -> None:
    """`ht` gives the same Gnielinski core for the same friction factor, long tube."""
    expected = ht.conv_internal.turbulent_Gnielinski(
        Re=reynolds, Pr=prandtl, fd=float(smooth_friction_factor(reynolds=reynolds))
    )
    value = turbulent_nusselt(reynolds=reynolds, prandtl=prandtl, diameter_length_ratio=0.0)
    assert float(value) == pytest.approx(expected, rel=1e-12)


@pytest.mark.parametrize("reynolds", [1e2, 2e3, 3e3, 5e4, 1e7])
@pytest.mark.parametrize("roughness", [0.0, 1e-4, 0.03])
def test_friction_agrees_with_a_public_library(reynolds: float, roughness: float) -> None:
    """`fluids` gives the same Churchill, Haaland and Colebrook factors."""
    arguments = {"reynolds": reynolds, "relative_roughness": roughness}
    assert float(churchill_1977(**arguments)) == pytest.approx(
        fluids.friction.Churchill_1977(reynolds, roughness), rel=1e-12
    )
    if reynolds > 2300.0:
        assert float(haaland_1983(**arguments)) == pytest.approx(
            fluids.friction.Haaland(reynolds, roughness), rel=1e-12
        )
        assert float(colebrook_1939(**arguments)) == pytest.approx(
            fluids.friction.Colebrook(reynolds, roughness), rel=1e-12
        )


def test_fluid_at_rest_has_the_developed_laminar_value() -> None:
    """Reynolds number 0 gives 3.66 and 4.364, and a friction factor that is finite."""
    rest = {"reynolds": 0.0, "prandtl": 5.0, "diameter_length_ratio": 0.02}
    assert float(gnielinski_1976(**rest)) == pytest.approx(3.66, rel=1e-14)
    assert float(gnielinski_1976_constant_flux(**rest)) == pytest.approx(4.364, rel=1e-14)
    assert np.isfinite(churchill_1977(reynolds=0.0, relative_roughness=0.0))


def test_slow_flow_has_hagens_factor() -> None:
    """Below Re 1000 f Re is 64 to a few parts in a thousand, at any roughness."""
    reynolds = np.array([1e-3, 1.0, 30.0, 1000.0])
    f = churchill_1977(reynolds=reynolds, relative_roughness=np.array([[0.0], [0.02]]))
    np.testing.assert_allclose(f * reynolds, 64.0, rtol=3e-3)


@pytest.mark.parametrize("edge", [2300.0, 4000.0])
@pytest.mark.parametrize("gas", [0.0, 1.0])
def test_no_jump_at_the_ends_of_transition(edge: float, gas: float) -> None:
    """A millionth in Re moves Nu and f by less than a hundred-thousandth at the joins."""
    around = edge * np.array([1.0 - 1e-6, 1.0 + 1e-6])
    for method in (gnielinski_1976, gnielinski_1976_constant_flux):
        nu = method(
            reynolds=around,
            prandtl=3.0,
            diameter_length_ratio=0.01,
            prandtl_wall=2.0,
            temperature_ratio=0.8,
            gas=gas,
        )
        assert abs(nu[1] / nu[0] - 1.0) < 1e-5
    f = churchill_1977(reynolds=around, relative_roughness=1e-3, viscosity_ratio=0.6, gas=gas)
    assert abs(f[1] / f[0] - 1.0) < 1e-5


def test_transition_is_linear_between_its_ends() -> None:
    """Half way between Re 2300 and 4000 Nu is the mean of the two ends (Gnielinski 2013)."""
    common = {"prandtl": 6.0, "diameter_length_ratio": 0.005}
    ends = 0.5 * (laminar_nusselt(reynolds=2300.0, **common) + turbulent_nusselt(reynolds=4000.0, **common))
    assert float(gnielinski_1976(reynolds=3150.0, **common)) == pytest.approx(float(ends), rel=1e-14)


def test_wall_factors_of_heat_transfer_by_hand() -> None:
    """Liquids (Pr/Pr_w)^0.11; heated gases (T/T_w)^0.45; cooled gases none; laminar gas none."""
    turbulent = {"reynolds": 3e4, "prandtl": 4.0, "diameter_length_ratio": 0.01}
    plain = float(gnielinski_1976(**turbulent))
    assert float(gnielinski_1976(prandtl_wall=2.0, **turbulent)) == pytest.approx(plain * 2.0**0.11)
    heated = gnielinski_1976(prandtl_wall=2.0, temperature_ratio=0.8, gas=1.0, **turbulent)
    assert float(heated) == pytest.approx(plain * 0.8**0.45)
    assert float(gnielinski_1976(temperature_ratio=1.3, gas=1.0, **turbulent)) == pytest.approx(plain)
    laminar = {**turbulent, "reynolds": 1e3}
    slow = float(gnielinski_1976(**laminar))
    assert float(gnielinski_1976(temperature_ratio=0.8, gas=1.0, **laminar)) == pytest.approx(slow)
    assert float(gnielinski_1976(prandtl_wall=2.0, **laminar)) == pytest.approx(slow * 2.0**0.11)


def test_wall_factors_of_friction_by_hand() -> None:
    """Petukhov's and Deissler's factors at a wall of half and twice the bulk viscosity; none for gases."""
    ratio = np.array([0.5, 1.0, 2.0])
    np.testing.assert_allclose(
        friction_wall_factor(reynolds=1e5, viscosity_ratio=ratio), [5.0 / 6.0, 1.0, 2.0**0.24]
    )
    np.testing.assert_allclose(
        friction_wall_factor(reynolds=1e3, viscosity_ratio=ratio), [0.5**0.58, 1.0, 2.0**0.5]
    )
    gas = churchill_1977(reynolds=1e5, relative_roughness=0.0, viscosity_ratio=0.5, gas=1.0)
    assert gas == churchill_1977(reynolds=1e5, relative_roughness=0.0)


def test_long_tubes_tend_to_the_developed_values() -> None:
    """D/L towards 0 gives 3.66, 4.364."""
    common = {"reynolds": 2000.0, "prandtl": 1.0, "diameter_length_ratio": 1e-9}
    assert float(laminar_nusselt(**common)) == pytest.approx(3.66, rel=1e-3)
    assert float(laminar_nusselt_constant_flux(**common)) == pytest.approx(4.364, rel=1e-3)


def test_bend_losses_by_hand() -> None:
    """Fully rough friction at e/D 0.0037 is 1/36; bends take 50 and 22 of it; a smooth tube stays finite."""
    assert float(fully_rough_friction_factor(relative_roughness=0.0037)) == pytest.approx(1.0 / 36.0)
    assert float(return_bend_loss(relative_roughness=0.0037)) == pytest.approx(50.0 / 36.0)
    wide = return_bend_loss(relative_roughness=0.0037, close_pattern=False)
    assert float(wide) == pytest.approx(22.0 / 36.0)
    assert np.isfinite(return_bend_loss(relative_roughness=0.0))


def test_friction_gradient_by_hand() -> None:
    """Friction factor 0.02, G 1000, D 20 mm, 1000 kg/m3: 500 Pa/m."""
    gradient = friction_gradient(
        friction_factor=0.02, mass_flux_kg_m2_s=1000.0, diameter_m=0.02, density_kg_m3=1000.0
    )
    assert float(gradient) == pytest.approx(500.0)


@settings(max_examples=200, deadline=None)
@given(
    reynolds=st.one_of(st.just(0.0), _decades(-6, 9)),
    prandtl=_decades(-4, 6),
    ratio=st.floats(0.0, 1.0),
    wall=_decades(-4, 6),
    temperature=_decades(-1.3, 1.3),
    gas=st.booleans(),
    roughness=st.floats(0.0, 0.1),
)
def test_every_input_in_the_nomenclature_gives_a_positive_number(
    *,
    reynolds: float,
    prandtl: float,
    ratio: float,
    wall: float,
    temperature: float,
    gas: bool,
    roughness: float,
) -> None:
    """Nu and f are finite and positive over the whole of the nomenclature's bounds."""
    for method in (gnielinski_1976, gnielinski_1976_constant_flux):
        nu = float(
            method(
                reynolds=reynolds,
                prandtl=prandtl,
                diameter_length_ratio=ratio,
                prandtl_wall=wall,
                temperature_ratio=temperature,
                gas=float(gas),
            )
        )
        assert np.isfinite(nu)
        assert nu > 0.0
    f = float(
        churchill_1977(
            reynolds=reynolds, relative_roughness=roughness, viscosity_ratio=wall / prandtl, gas=float(gas)
        )
    )
    assert np.isfinite(f)
    assert f > 0.0
