"""Condensation in tubes: joins of regimes, limits, geometry, gas layer and an independent library."""

import inspect
from collections.abc import Callable
from math import pi, sin
from typing import Any

import ht
import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from numpy.typing import NDArray
from scipy.optimize import brentq

from crossbank_service.methods import inside_single_phase, inside_two_phase_drop
from crossbank_service.methods.inside_condensing import (
    RECORDS,
    cavallini_2006,
    cavallini_transition,
    chato_1962,
    colburn_hougen,
    dobson_chato_1998,
    falling_film_local,
    falling_film_mean,
    shah_1979,
    shah_2016,
    silver_bell_ghaly,
    steam_air_diffusivity,
    stratified_angle,
    thome_2003,
)
from crossbank_service.methods.nomenclature import NOMENCLATURE

Floats = NDArray[np.float64]

_STEAM = {
    "diameter_m": 0.021,
    "temperature_difference_k": 6.0,
    "liquid_density_kg_m3": 931.818,
    "vapour_density_kg_m3": 1.65082,
    "liquid_viscosity_pa_s": 2.06912e-4,
    "vapour_viscosity_pa_s": 1.33943e-5,
    "liquid_conductivity_w_m_k": 0.682928,
    "liquid_heat_capacity_j_kg_k": 4268.56,
    "latent_heat_j_kg": 2163456.0,
    "surface_tension_n_m": 0.052145,
    "reduced_pressure": 0.0135968,
}
_LOCAL = (cavallini_2006, dobson_chato_1998, shah_2016, thome_2003)


def _call(function: Callable[..., Any], **changes: Any) -> Floats:
    accepted = inspect.signature(function).parameters
    values = {name: value for name, value in (_STEAM | changes).items() if name in accepted}
    return np.asarray(function(**values), dtype=np.float64)


def test_shah_1979_agrees_with_a_public_library() -> None:
    """`ht` gives the same shear-controlled coefficient."""
    expected = ht.condensation.Shah(
        m=120.0 * pi * 0.021**2 / 4.0,
        x=0.4,
        D=0.021,
        rhol=931.818,
        mul=2.06912e-4,
        kl=0.682928,
        Cpl=4268.56,
        P=0.0135968,
        Pc=1.0,
    )
    assert float(_call(shah_1979, quality=0.4, mass_flux_kg_m2_s=120.0)) == pytest.approx(expected, rel=1e-12)


def test_laminar_film_agrees_with_a_public_library() -> None:
    """`ht` gives the same mean on a plate whose condensate has the film Reynolds number asked for."""
    density, viscosity, conductivity, heat = 950.0, 3e-4, 0.68, 2.2e6
    height, difference = 0.05, 0.2
    expected = ht.condensation.Nusselt_laminar(
        Tsat=370.0, Tw=370.0 - difference, rhog=0.0, rhol=density, kl=conductivity, mul=viscosity,
        Hvap=heat, L=height,
    )  # fmt: skip
    reynolds = 4.0 * expected * height * difference / (heat * viscosity)
    assert reynolds < 30.0
    value = falling_film_mean(
        film_reynolds=reynolds,
        liquid_density_kg_m3=density,
        liquid_viscosity_pa_s=viscosity,
        liquid_conductivity_w_m_k=conductivity,
        liquid_heat_capacity_j_kg_k=4200.0,
    )
    assert float(value) == pytest.approx(expected, rel=1e-9)


def test_local_film_and_mean_film_agree_in_laminar_flow() -> None:
    """Nusselt's mean is 4/3 of the local coefficient at the foot."""
    film = {
        "film_reynolds": 5.0,
        "liquid_density_kg_m3": 950.0,
        "liquid_viscosity_pa_s": 3e-4,
        "liquid_conductivity_w_m_k": 0.68,
        "liquid_heat_capacity_j_kg_k": 4200.0,
    }
    assert float(falling_film_mean(**film) / falling_film_local(**film)) == pytest.approx(4.0 / 3.0)


@pytest.mark.parametrize("edge", [30.0, 1800.0])
def test_mean_film_joins_within_its_constants(edge: float) -> None:
    """The film's forms meet within 2 %."""
    film = {
        "liquid_density_kg_m3": 950.0,
        "liquid_viscosity_pa_s": 2.2e-4,
        "liquid_conductivity_w_m_k": 0.68,
        "liquid_heat_capacity_j_kg_k": 4200.0,
    }
    h = falling_film_mean(film_reynolds=edge * np.array([1.0, 1.0 + 1e-9]), **film)
    assert abs(h[1] / h[0] - 1.0) < 0.02


@pytest.mark.parametrize("quality", [0.1, 0.5, 0.95])
@pytest.mark.parametrize("hydrocarbon", [0.0, 1.0])
def test_cavallini_is_continuous_where_its_forms_meet(quality: float, hydrocarbon: float) -> None:
    """At J = J_T the gravity form ends at the shear form: no jump to 1e-7."""
    x_tt = ((1.0 - quality) / quality) ** 0.9 * (1.65082 / 931.818) ** 0.5 * (2.06912e-4 / 1.33943e-5) ** 0.1
    velocity = float(cavallini_transition(martinelli_parameter=x_tt, hydrocarbon=hydrocarbon))
    flux = velocity * (9.80665 * 0.021 * 1.65082 * (931.818 - 1.65082)) ** 0.5 / quality
    h = _call(
        cavallini_2006,
        quality=quality,
        hydrocarbon=hydrocarbon,
        mass_flux_kg_m2_s=flux * np.array([1.0 - 1e-8, 1.0, 1.0 + 1e-8]),
    )
    np.testing.assert_allclose(h, h[1], rtol=1e-7)


def test_cavallini_without_flow_is_the_draining_film() -> None:
    """Mass flux 0 leaves Nusselt's film, whatever drains at the bottom, near Chato's 12 kW/(m2 K)."""
    h = float(_call(cavallini_2006, quality=0.85, mass_flux_kg_m2_s=0.0))
    film = (
        9.80665 * 931.818 * (931.818 - 1.65082) * 0.682928**3 * 2163456.0 / (2.06912e-4 * 6.0 * 0.021)
    ) ** 0.25
    assert h == pytest.approx(0.725 * film / (1.0 + 0.741 * (0.15 / 0.85) ** 0.3321), rel=1e-12)


def test_shah_is_film_when_slow_and_shear_when_fast() -> None:
    """Regime III has no shear, regime I no film: coefficients fall, then grow, with the mass flux."""
    slow = _call(shah_2016, quality=0.5, mass_flux_kg_m2_s=np.array([2.0, 4.0]))
    assert float(slow[1] / slow[0]) == pytest.approx(2.0 ** (-1.0 / 3.0), rel=1e-12)
    fast = _call(shah_2016, quality=0.5, mass_flux_kg_m2_s=np.array([400.0, 800.0]))
    assert float(fast[1] / fast[0]) == pytest.approx(2.0**0.8, rel=1e-12)


def test_stratified_angle_agrees_with_the_circle() -> None:
    """The explicit angle is within 2e-4 rad of the circle's geometry and exact half full."""
    for dry in np.linspace(0.2, 2.0 * pi - 0.2, 25):
        wet = 2.0 * pi - float(dry)
        void = 1.0 - (wet - sin(wet)) / (2.0 * pi)
        assert float(stratified_angle(void_fraction=void)) == pytest.approx(float(dry), abs=2e-4)
    assert float(stratified_angle(void_fraction=0.5)) == pytest.approx(pi, abs=1e-12)


def test_thome_has_no_jump_between_flow_patterns() -> None:
    """A ten-thousandth more flow, from stratified to annular, moves the coefficient by less than 1 %."""
    # the dry angle leaves annular flow as a square root: steep there, but no jump
    flux = 8.0 * 1.0001 ** np.arange(33000)
    h = _call(thome_2003, quality=0.6, mass_flux_kg_m2_s=flux)
    assert np.abs(np.diff(np.log(h))).max() < 0.01


def test_thome_is_level_beyond_the_least_wavy_boundary() -> None:
    """Just below and above the quality of the boundary's minimum the coefficient has no jump."""
    quality = np.linspace(0.7, 0.95, 251)
    h = _call(thome_2003, quality=quality, mass_flux_kg_m2_s=60.0)
    assert np.abs(np.diff(np.log(h))).max() < 0.01


def test_a_case_does_not_depend_on_its_neighbours() -> None:
    """A case alone gives the same bits as among others, in every method."""
    quality, flux = np.array([0.0, 0.31, 0.7, 1.0]), np.array([0.0, 3.0, 70.0, 900.0])
    for function in _LOCAL:
        together = _call(function, quality=quality, mass_flux_kg_m2_s=flux)
        alone = [float(_call(function, quality=quality[i], mass_flux_kg_m2_s=flux[i])) for i in range(4)]
        assert together.tolist() == alone


def _line(difference: float) -> Callable[[Floats], Floats]:
    """Saturation pressure of steam about 3 bar by Clausius and Clapeyron, constant heat."""

    def pressure(temperature: Floats) -> Floats:
        value: Floats = 3e5 * np.exp(difference * (1.0 / 406.67 - 1.0 / temperature))
        return value

    return pressure


def _gas_case(share: float | Floats) -> dict[str, Any]:
    pressure = 3e5 * np.asarray(share)
    return {
        "film_coefficient_w_m2_k": 10000.0,
        "gas_coefficient_w_m2_k": 80.0,
        "wall_temperature_k": 393.15,
        "bulk_temperature_k": 1.0 / (1.0 / 406.67 - np.log(share) / 4690.0),
        "pressure_pa": 3e5,
        "vapour_pressure_pa": pressure,
        "saturation_pressure": _line(4690.0),
        "latent_heat_j_kg": 2.17e6,
        "gas_heat_capacity_j_kg_k": 2100.0,
        "vapour_molar_mass_kg_mol": 0.018015,
        "mixture_molar_mass_kg_mol": 0.0182,
        "lewis": 0.5,
    }


@pytest.mark.parametrize(
    ("share", "flux", "interface"), [(0.98, 118498.0, 405.000), (0.90, 72357.0, 400.386)]
)
def test_steam_with_air_at_three_bar(share: float, flux: float, interface: float) -> None:
    """Steam and air at 3 bar, wall 393.15 K: an independent solution, within 5 % for its properties."""
    q, t = colburn_hougen(**_gas_case(share))
    assert float(q) == pytest.approx(flux, rel=0.05)
    assert float(t) == pytest.approx(interface, abs=0.4)


def test_interface_agrees_with_a_scalar_root() -> None:
    """The interface temperatures of many shares agree with Brent's method one by one."""
    shares = np.array([0.999999, 0.98, 0.9, 0.5, 0.35])
    _, interface = colburn_hougen(**_gas_case(shares))
    for index, share in enumerate(shares.tolist()):
        case = _gas_case(share)
        mass = 0.018015 / 0.0182 * 2.17e6 * 80.0 / 2100.0 * 0.5 ** (-2.0 / 3.0)

        def excess(t: float, case: dict[str, Any] = case, mass: float = mass) -> float:
            saturation = float(case["saturation_pressure"](np.float64(t)))
            ratio = (3e5 - saturation) / (3e5 - float(case["vapour_pressure_pa"]))
            return (
                1e4 * (t - 393.15)
                - 80.0 * (float(case["bulk_temperature_k"]) - t)
                - mass * float(np.log(ratio))
            )

        top = float(case["bulk_temperature_k"])
        expected = brentq(excess, min(393.15, top), max(393.15, top), xtol=1e-12)
        if top > 393.15:
            assert float(interface[index]) == pytest.approx(expected, abs=1e-9)


def test_pure_vapour_has_no_gas_layer_and_gas_takes_its_toll() -> None:
    """Without gas the interface is at the vapour's temperature; more gas means less heat."""
    q, t = colburn_hougen(**_gas_case(np.array([1.0, 0.99, 0.95, 0.8])))
    assert float(t[0]) == pytest.approx(406.67, abs=1e-5)
    assert (np.diff(q) < 0.0).all()


def test_gas_layer_in_series_vanishes_with_its_share() -> None:
    """Z = 0 leaves the film; Z = 1 puts the whole gas resistance in series."""
    common = {"film_coefficient_w_m2_k": 9000.0, "gas_coefficient_w_m2_k": 80.0}
    assert float(silver_bell_ghaly(sensible_share=0.0, **common)) == pytest.approx(9000.0)
    assert float(silver_bell_ghaly(sensible_share=1.0, **common)) == pytest.approx(9000.0 * 80.0 / 9080.0)


def test_diffusivity_branches_meet() -> None:
    """The warm and the hot branch of Marrero and Mason meet at 450 K within 0.1 %."""
    d = steam_air_diffusivity(temperature_k=np.array([450.0 - 1e-9, 450.0]), pressure_pa=101325.0)
    assert abs(d[1] / d[0] - 1.0) < 1e-3


@pytest.mark.parametrize(
    "record",
    [*RECORDS, *inside_single_phase.RECORDS, *inside_two_phase_drop.RECORDS],
    ids=lambda record: record.slug,
)
def test_record_and_signature_are_one(record: Any) -> None:
    """A record's inputs and options are the function's arguments and stand in the nomenclature."""
    parameters = inspect.signature(record.function).parameters
    required = {name for name, value in parameters.items() if value.default is inspect.Parameter.empty}
    assert required == set(record.inputs)
    assert set(parameters) - required == set(record.options)
    for name in (*record.inputs, *record.options, record.gives, *(limit.quantity for limit in record.limits)):
        assert name in NOMENCLATURE


@settings(max_examples=200, deadline=None)
@given(
    quality=st.floats(0.0, 1.0),
    flux=st.one_of(st.just(0.0), st.floats(-6.0, 4.0).map(lambda power: 10.0**power)),
    bore=st.floats(-3.0, -0.5).map(lambda power: 10.0**power),
    difference=st.one_of(st.just(0.0), st.floats(-6.0, 2.5).map(lambda power: 10.0**power)),
    contrast=st.floats(0.02, 5.0).map(lambda power: 10.0**-power),
    thickness=st.floats(-0.5, 4.0).map(lambda power: 10.0**power),
    tension=st.floats(-6.0, 0.0).map(lambda power: 10.0**power),
    pressure=st.floats(0.0, 1.0),
)
def test_coefficients_are_finite_and_positive(
    *,
    quality: float,
    flux: float,
    bore: float,
    difference: float,
    contrast: float,
    thickness: float,
    tension: float,
    pressure: float,
) -> None:
    """Any quality, flow, bore, difference and pair of phases gives a positive number."""
    changes = {
        "quality": quality,
        "mass_flux_kg_m2_s": flux,
        "diameter_m": bore,
        "temperature_difference_k": difference,
        "vapour_density_kg_m3": 931.818 * contrast,
        "liquid_viscosity_pa_s": 1.33943e-5 * thickness,
        "surface_tension_n_m": tension,
        "reduced_pressure": pressure,
    }
    for function in (*_LOCAL, chato_1962):
        h = float(_call(function, **changes))
        assert np.isfinite(h), function.__name__
        assert h > 0.0, function.__name__
    upright = float(_call(shah_2016, vertical=1.0, **changes))
    assert np.isfinite(upright)
    assert upright > 0.0
