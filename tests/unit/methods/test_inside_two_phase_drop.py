"""Two-phase gradients, void fractions and momentum flux: limits and an independent library."""

from math import pi

import fluids
import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from crossbank_service.methods.inside_two_phase_drop import (
    friedel_1979,
    homogeneous_void,
    lockhart_martinelli_1949,
    log_mean_void,
    momentum_flux,
    mueller_steinhagen_heck_1986,
    phase_gradient,
    rouhani_axelsson_void,
    zivi_void,
)

_LIQUID, _VAPOUR, _TENSION, _BORE = 931.818, 1.65082, 0.052145, 0.021
_DENSITIES = {"liquid_density_kg_m3": _LIQUID, "vapour_density_kg_m3": _VAPOUR}
_STEAM = {
    **_DENSITIES,
    "diameter_m": _BORE,
    "liquid_viscosity_pa_s": 2.06912e-4,
    "vapour_viscosity_pa_s": 1.33943e-5,
}


@pytest.mark.parametrize(("flux", "quality"), [(8.0, 0.85), (30.0, 0.4), (120.0, 0.85), (200.0, 0.1)])
def test_lockhart_martinelli_agrees_with_a_public_library(flux: float, quality: float) -> None:
    """`fluids` gives the same gradient away from Re 2000."""
    expected = fluids.two_phase.Lockhart_Martinelli(
        m=flux * pi * _BORE**2 / 4.0,
        x=quality,
        rhol=_LIQUID,
        rhog=_VAPOUR,
        mul=_STEAM["liquid_viscosity_pa_s"],
        mug=_STEAM["vapour_viscosity_pa_s"],
        D=_BORE,
        L=1.0,
    )
    value = lockhart_martinelli_1949(quality=quality, mass_flux_kg_m2_s=flux, **_STEAM)
    assert float(value) == pytest.approx(expected, rel=1e-12)


@pytest.mark.parametrize(("flux", "quality"), [(30.0, 0.4), (80.0, 0.2), (120.0, 0.85)])
def test_multipliers_agree_with_a_public_library_within_friction_laws(flux: float, quality: float) -> None:
    """`fluids` with Colebrook's factor lies within 5 % of Friedel's and 6 % of Blasius' law."""
    arguments = {
        "m": flux * pi * _BORE**2 / 4.0,
        "x": quality,
        "rhol": _LIQUID,
        "rhog": _VAPOUR,
        "mul": _STEAM["liquid_viscosity_pa_s"],
        "mug": _STEAM["vapour_viscosity_pa_s"],
        "D": _BORE,
        "L": 1.0,
    }
    friedel = friedel_1979(quality=quality, mass_flux_kg_m2_s=flux, surface_tension_n_m=_TENSION, **_STEAM)
    assert float(friedel) == pytest.approx(fluids.two_phase.Friedel(sigma=_TENSION, **arguments), rel=0.05)
    heck = mueller_steinhagen_heck_1986(quality=quality, mass_flux_kg_m2_s=flux, **_STEAM)
    assert float(heck) == pytest.approx(fluids.two_phase.Muller_Steinhagen_Heck(**arguments), rel=0.06)


@pytest.mark.parametrize("quality", [0.01, 0.3, 0.7, 0.99])
def test_void_fractions_agree_with_a_public_library(quality: float) -> None:
    """`fluids` gives the same homogeneous, Zivi and Rouhani-Axelsson (Steiner) void fractions."""
    voidage = fluids.two_phase_voidage
    assert float(homogeneous_void(quality=quality, **_DENSITIES)) == pytest.approx(
        voidage.homogeneous(x=quality, rhol=_LIQUID, rhog=_VAPOUR), rel=1e-12
    )
    assert float(zivi_void(quality=quality, **_DENSITIES)) == pytest.approx(
        voidage.Zivi(x=quality, rhol=_LIQUID, rhog=_VAPOUR), rel=1e-12
    )
    drift = rouhani_axelsson_void(
        quality=quality, mass_flux_kg_m2_s=30.0, surface_tension_n_m=_TENSION, **_DENSITIES
    )
    expected = voidage.Steiner(
        x=quality, rhol=_LIQUID, rhog=_VAPOUR, sigma=_TENSION, m=30.0 * pi * _BORE**2 / 4.0, D=_BORE
    )
    assert float(drift) == pytest.approx(expected, rel=1e-12)


@pytest.mark.parametrize("flux", [1.0, 20.0, 300.0])
def test_gradients_join_single_phase_at_both_ends(flux: float) -> None:
    """Quality 0 and 1 give liquid alone and vapour alone, and quality near them tends there."""
    liquid = phase_gradient(
        mass_flux_kg_m2_s=flux, diameter_m=_BORE, density_kg_m3=_LIQUID, viscosity_pa_s=2.06912e-4
    )
    vapour = phase_gradient(
        mass_flux_kg_m2_s=flux, diameter_m=_BORE, density_kg_m3=_VAPOUR, viscosity_pa_s=1.33943e-5
    )
    ends = np.array([0.0, 1.0])
    heck = mueller_steinhagen_heck_1986(quality=ends, mass_flux_kg_m2_s=flux, **_STEAM)
    np.testing.assert_allclose(heck, [liquid, vapour], rtol=1e-12)
    near = np.array([1e-13, 1.0 - 1e-13])
    for method, arguments in (
        (mueller_steinhagen_heck_1986, _STEAM),
        (friedel_1979, _STEAM | {"surface_tension_n_m": _TENSION}),
        (lockhart_martinelli_1949, _STEAM),
    ):
        at_ends = method(quality=ends, mass_flux_kg_m2_s=flux, **arguments)
        np.testing.assert_allclose(
            method(quality=near, mass_flux_kg_m2_s=flux, **arguments), at_ends, rtol=0.05
        )


@pytest.mark.parametrize("flux", [1.0, 20.0, 300.0])
def test_each_source_keeps_its_own_friction_law(flux: float) -> None:
    """At quality 0 and 1 Friedel's and Lockhart's gradients are their own friction laws, by hand."""
    ends = np.array([0.0, 1.0])
    density = np.array([_LIQUID, _VAPOUR])
    reynolds = flux * _BORE / np.array([2.06912e-4, 1.33943e-5])
    head = flux**2 / (2.0 * density * _BORE)
    logarithm = np.log(np.maximum(reynolds, 100.0))
    fast = (0.86859 * np.log(reynolds / (1.964 * logarithm - 3.8215))) ** -2.0
    friedel = friedel_1979(quality=ends, mass_flux_kg_m2_s=flux, surface_tension_n_m=_TENSION, **_STEAM)
    np.testing.assert_allclose(friedel, np.where(reynolds < 1055.0, 64.0 / reynolds, fast) * head, rtol=1e-12)
    martinelli = lockhart_martinelli_1949(quality=ends, mass_flux_kg_m2_s=flux, **_STEAM)
    slow = np.where(reynolds < 2000.0, 64.0 / reynolds, 0.184 * reynolds**-0.2)
    clear = (reynolds < 2000.0) | (reynolds > 2400.0)
    np.testing.assert_allclose(martinelli[clear], (slow * head)[clear], rtol=1e-12)


def test_nothing_flows_and_nothing_is_lost() -> None:
    """Mass flux 0 gives gradient and momentum flux 0 at any quality."""
    quality = np.array([0.0, 0.5, 1.0])
    for gradient in (
        mueller_steinhagen_heck_1986(quality=quality, mass_flux_kg_m2_s=0.0, **_STEAM),
        friedel_1979(quality=quality, mass_flux_kg_m2_s=0.0, surface_tension_n_m=_TENSION, **_STEAM),
        lockhart_martinelli_1949(quality=quality, mass_flux_kg_m2_s=0.0, **_STEAM),
        momentum_flux(quality=quality, mass_flux_kg_m2_s=0.0, void_fraction=quality, **_DENSITIES),
    ):
        assert gradient.tolist() == [0.0, 0.0, 0.0]


def test_lockhart_martinelli_has_no_jump_where_a_phase_turns_turbulent() -> None:
    """Liquid Reynolds numbers about 2000 and 2400 change the gradient smoothly."""
    for edge in (2000.0, 2400.0):
        flux = edge * 2.06912e-4 / _BORE / 0.6 * np.array([1.0 - 1e-7, 1.0 + 1e-7])
        gradient = lockhart_martinelli_1949(quality=0.4, mass_flux_kg_m2_s=flux, **_STEAM)
        assert abs(gradient[1] / gradient[0] - 1.0) < 1e-5


@pytest.mark.parametrize("kind", ["homogeneous", "zivi", "drift", "log mean"])
def test_void_and_momentum_at_the_ends(kind: str) -> None:
    """Void runs from 0 to 1 and the momentum flux there is that of liquid and of vapour alone."""
    quality = np.array([0.0, 1e-14, 1.0 - 1e-14, 1.0])
    flow = {"mass_flux_kg_m2_s": 50.0, "surface_tension_n_m": _TENSION}
    void = {
        "homogeneous": lambda: homogeneous_void(quality=quality, **_DENSITIES),
        "zivi": lambda: zivi_void(quality=quality, **_DENSITIES),
        "drift": lambda: rouhani_axelsson_void(quality=quality, **flow, **_DENSITIES),
        "log mean": lambda: log_mean_void(quality=quality, **flow, **_DENSITIES),
    }[kind]()
    assert void[0] == 0.0
    assert void[3] == pytest.approx(1.0, abs=1e-15)
    flux = momentum_flux(quality=quality, mass_flux_kg_m2_s=50.0, void_fraction=void, **_DENSITIES)
    liquid, vapour = 2500.0 / _LIQUID, 2500.0 / _VAPOUR
    np.testing.assert_allclose(flux, [liquid, liquid, vapour, vapour], rtol=1e-6)


def test_log_mean_void_is_the_log_mean() -> None:
    """(e_h - e_ra)/ln(e_h/e_ra) from the two void fractions themselves."""
    quality = np.array([0.05, 0.4, 0.9])
    flow = {"mass_flux_kg_m2_s": 30.0, "surface_tension_n_m": _TENSION}
    high = homogeneous_void(quality=quality, **_DENSITIES)
    low = rouhani_axelsson_void(quality=quality, **flow, **_DENSITIES)
    expected = (high - low) / np.log(high / low)
    np.testing.assert_allclose(log_mean_void(quality=quality, **flow, **_DENSITIES), expected, rtol=1e-12)


@settings(max_examples=200, deadline=None)
@given(
    quality=st.floats(0.0, 1.0),
    flux=st.one_of(st.just(0.0), st.floats(-9.0, 4.0).map(lambda power: 10.0**power)),
    contrast=st.floats(0.0, 5.0).map(lambda power: 10.0**-power),
    thickness=st.floats(-1.0, 4.0).map(lambda power: 10.0**power),
    tension=st.floats(-6.0, 0.0).map(lambda power: 10.0**power),
)
def test_gradients_and_voids_are_finite(
    *, quality: float, flux: float, contrast: float, thickness: float, tension: float
) -> None:
    """Any quality, flow and pair of phases gives finite gradients, void fractions from 0 to 1."""
    phases = {"liquid_density_kg_m3": 900.0, "vapour_density_kg_m3": 900.0 * contrast}
    state = {
        **phases,
        "diameter_m": 0.02,
        "liquid_viscosity_pa_s": 1e-5 * thickness,
        "vapour_viscosity_pa_s": 1e-5,
    }
    flow = {"quality": quality, "mass_flux_kg_m2_s": flux}
    gradients = [
        mueller_steinhagen_heck_1986(**flow, **state),
        friedel_1979(surface_tension_n_m=tension, **flow, **state),
        lockhart_martinelli_1949(**flow, **state),
    ]
    voids = [
        homogeneous_void(quality=quality, **phases),
        zivi_void(quality=quality, **phases),
        rouhani_axelsson_void(surface_tension_n_m=tension, **flow, **phases),
        log_mean_void(surface_tension_n_m=tension, **flow, **phases),
    ]
    momenta = [momentum_flux(void_fraction=void, **flow, **phases) for void in voids]
    assert np.isfinite(gradients + momenta).all()
    assert min(gradients + momenta) >= 0.0
    assert min(voids) >= 0.0
    assert max(voids) <= 1.0 + 1e-15
