"""Solutions against the library whose functions they spline."""

import CoolProp
import numpy as np
import pytest
from CoolProp.CoolProp import AbstractState

from crossbank_service.properties import SOLUTIONS, Solution, freezing_temperature, solution_limits


@pytest.mark.parametrize("slug", SOLUTIONS)
def test_solutions_repeat_the_source_functions(slug: str) -> None:
    """Random mass fractions and temperatures above freezing, within 1e-5 (1e-4 in viscosity)."""
    limits = solution_limits(slug)
    rng = np.random.default_rng(9)
    x = rng.uniform(0.0, limits.highest_mass_fraction, 40)
    freezing = freezing_temperature(slug, x)
    t = freezing + 0.01 + rng.uniform(0.0, 1.0, 40) * (limits.highest_temperature_k - freezing - 0.02)
    reference = AbstractState("INCOMP", SOLUTIONS[slug].equation)
    ours = Solution(slug, x).at(t, np.array(1e6))
    for i in range(40):
        reference.set_mass_fractions([float(x[i])])
        assert freezing[i] == pytest.approx(reference.keyed_output(CoolProp.iT_freeze), abs=2e-3)
        reference.update(CoolProp.PT_INPUTS, 1e6, t[i])
        assert ours.density_kg_m3[i] == pytest.approx(reference.rhomass(), rel=1e-5)
        assert ours.heat_capacity_j_kg_k[i] == pytest.approx(reference.cpmass(), rel=1e-5)
        assert ours.conductivity_w_m_k[i] == pytest.approx(reference.conductivity(), rel=1e-5)
        assert ours.viscosity_pa_s[i] == pytest.approx(reference.viscosity(), rel=1e-4)


@pytest.mark.parametrize(
    ("slug", "percent", "celsius"),
    [
        ("ethylene-glycol-water", 30.0, -14.6),
        ("ethylene-glycol-water", 50.0, -36.0),
        ("propylene-glycol-water", 30.0, -12.7),
        ("sodium-chloride-water", 23.0, -20.7),
        ("calcium-chloride-water", 29.4, -45.0),
    ],
)
def test_freezing_points_are_those_of_the_trade(slug: str, percent: float, celsius: float) -> None:
    """Freezing points of common strengths, common practice without a single source, within 2.5 K."""
    t = float(freezing_temperature(slug, np.array([percent / 100.0]))[0])
    assert t - 273.15 == pytest.approx(celsius, abs=2.5)


def test_below_freezing_the_properties_are_held() -> None:
    """Colder than freezing the properties stay and the enthalpy goes on with the heat capacity."""
    medium = Solution("propylene-glycol-water", np.array([0.3]))
    freezing = freezing_temperature("propylene-glycol-water", np.array([0.3]))
    p = np.array(2e5)
    at, below = medium.at(freezing, p), medium.at(freezing - 30.0, p)
    assert below.viscosity_pa_s[0] == at.viscosity_pa_s[0]
    drop = medium.enthalpy(freezing, p) - medium.enthalpy(freezing - 30.0, p)
    assert drop[0] == pytest.approx(30.0 * at.heat_capacity_j_kg_k[0], rel=1e-12)


def test_water_without_solute_is_near_water() -> None:
    """At mass fraction 0 the glycol functions give water within 1.5 %."""
    state = Solution("ethylene-glycol-water", np.array([0.0])).at(np.array([313.15]), np.array(2e5))
    assert state.density_kg_m3[0] == pytest.approx(992.2, rel=2e-3)
    assert state.heat_capacity_j_kg_k[0] == pytest.approx(4179.0, rel=5e-3)
    assert state.conductivity_w_m_k[0] == pytest.approx(0.6286, rel=0.015)
    assert state.viscosity_pa_s[0] == pytest.approx(0.6527e-3, rel=0.015)


def test_unknown_solution_is_refused_with_the_known_ones() -> None:
    """A solution that is not there is refused, naming what there is."""
    with pytest.raises(KeyError, match=r"brine.*ethylene-glycol-water"):
        Solution("brine", np.array([0.2]))
