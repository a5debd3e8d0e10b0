"""What the engine relies on, asked of every medium in the same way."""

from collections.abc import Callable

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from crossbank_service.properties import (
    GASES,
    GasMixture,
    Medium,
    MoistAir,
    PureSinglePhase,
    Solution,
    State,
    Table,
    TablePoints,
)
from crossbank_service.properties.medium import Array

CASES = 5
RNG = np.random.default_rng(11)


def _table(*, gas: bool) -> Table:
    two = TablePoints(
        temperature_k=[280.0, 400.0],
        density_kg_m3=[900.0, 800.0],
        heat_capacity_j_kg_k=[2000.0, 2400.0],
        conductivity_w_m_k=[0.13, 0.11],
        viscosity_pa_s=[2e-2, 1e-3],
        pressure_pa=2e5,
    )
    three = TablePoints(
        temperature_k=[290.0, 340.0, 420.0],
        density_kg_m3=[900.0, 850.0, 800.0],
        heat_capacity_j_kg_k=[2000.0, 2150.0, 2400.0],
        conductivity_w_m_k=[0.13, 0.12, 0.11],
        viscosity_pa_s=[2e-2, 4e-3, 1e-3],
    )
    one = TablePoints(
        temperature_k=[300.0],
        density_kg_m3=[1.2],
        heat_capacity_j_kg_k=[1005.0],
        conductivity_w_m_k=[0.026],
        viscosity_pa_s=[1.8e-5],
    )
    return Table.of([two, three, one, three, two], gas=gas)


def _mixture() -> GasMixture:
    fractions = RNG.uniform(0.0, 1.0, (CASES, len(GASES)))
    fractions[:, 5:] = 0.0
    fractions[2, 7] = 0.3
    return GasMixture.of({name: fractions[:, i] for i, name in enumerate(GASES)})


MEDIA: dict[str, tuple[Callable[[], Medium], float, float, float]] = {
    "moist-air": (lambda: MoistAir(np.array([0.0, 0.005, 0.02, 0.3, 2.0])), 180.0, 1700.0, 101325.0),
    "gas-mixture": (_mixture, 250.0, 1700.0, 101325.0),
    "water": (lambda: PureSinglePhase("water", "liquid"), 274.0, 440.0, 1e6),
    "steam": (lambda: PureSinglePhase("water", "gas"), 390.0, 1500.0, 1e5),
    "propane": (lambda: PureSinglePhase("propane", "gas"), 260.0, 640.0, 1e5),
    "nitrogen": (lambda: PureSinglePhase("nitrogen", "gas"), 160.0, 1900.0, 1e6),
    "r134a": (lambda: PureSinglePhase("r134a", "liquid"), 180.0, 310.0, 2e6),
    "glycol": (
        lambda: Solution("ethylene-glycol-water", np.array([0.0, 0.1, 0.3, 0.45, 0.6])),
        274.0,
        372.0,
        2e5,
    ),
    "table-liquid": (lambda: _table(gas=False), 295.0, 390.0, 2e5),
    "table-gas": (lambda: _table(gas=True), 295.0, 390.0, 1e5),
}
EVERY = pytest.mark.parametrize("name", MEDIA)


def _fields(state: State) -> dict[str, Array]:
    return {
        "density": state.density_kg_m3,
        "heat capacity": state.heat_capacity_j_kg_k,
        "conductivity": state.conductivity_w_m_k,
        "viscosity": state.viscosity_pa_s,
    }


@EVERY
def test_every_array_has_the_shape_of_the_temperatures(name: str) -> None:
    """Properties come in the shape asked for, whatever the trailing axes and the pressure's shape."""
    build, low, high, p = MEDIA[name]
    for shape in ((CASES,), (CASES, 3), (CASES, 2, 4)):
        t = np.full(shape, 0.5 * (low + high))
        for pressure in (np.array(p), np.full((CASES,) + (1,) * (len(shape) - 1), p), np.full(shape, p)):
            for label, values in _fields(build().at(t, pressure)).items():
                assert values.shape == shape, label
            assert build().enthalpy(t, pressure).shape == shape


@EVERY
def test_a_case_does_not_depend_on_its_neighbours(name: str) -> None:
    """Each case alone gives bit for bit what it gives within the batch, taken or strided."""
    build, low, high, p = MEDIA[name]
    medium = build()
    t = np.random.default_rng(5).uniform(low, high, (CASES, 7))
    pressure = np.full((CASES, 1), p)
    whole, enthalpy = _fields(medium.at(t, pressure)), medium.enthalpy(t, pressure)
    for i in range(CASES):
        alone = medium.take(np.array([i]))
        for label, values in _fields(alone.at(t[i : i + 1], pressure[i : i + 1])).items():
            assert np.array_equal(values[0], whole[label][i]), label
        assert np.array_equal(alone.enthalpy(t[i : i + 1], pressure[i : i + 1])[0], enthalpy[i])
    order = np.array([3, 1, 4])
    for label, values in _fields(medium.take(order).at(t[order], pressure[order])).items():
        assert np.array_equal(values, whole[label][order]), label
    strided = np.repeat(t, 2, axis=1)[:, ::2]
    for label, values in _fields(medium.at(strided, pressure)).items():
        assert np.array_equal(values, whole[label]), label


@EVERY
def test_enthalpy_is_the_integral_of_the_heat_capacity(name: str) -> None:
    """Simpson's rule over the heat capacity gives the rise of enthalpy within 1e-4."""
    build, low, high, p = MEDIA[name]
    medium = build()
    a = np.linspace(low, high, 200)[:-1] * np.ones((CASES, 1))
    b = a + (high - low) / 199
    pressure = np.full((CASES, 1), p)
    rise = medium.enthalpy(b, pressure) - medium.enthalpy(a, pressure)
    cp = [medium.at(t, pressure).heat_capacity_j_kg_k for t in (a, 0.5 * (a + b), b)]
    simpson = (cp[0] + 4.0 * cp[1] + cp[2]) / 6.0 * (b - a)
    # at a kink of a caller's table the rule itself is off within one interval
    tolerance = 2e-3 if name.startswith("table") else 1e-4
    assert np.all(np.abs(rise / simpson - 1.0) < tolerance)
    assert np.allclose(rise.sum(axis=1), simpson.sum(axis=1), rtol=1e-5)


@EVERY
def test_temperature_follows_from_enthalpy_by_newton(name: str) -> None:
    """Newton's iteration with the heat capacity brings back the temperature from a start well outside."""
    build, low, high, p = MEDIA[name]
    medium = build()
    goal = np.linspace(low, high, 9) * np.ones((CASES, 1))
    pressure = np.full((CASES, 1), p)
    h = medium.enthalpy(goal, pressure)
    for start in (low - 150.0, high + 900.0):
        t = np.full_like(goal, start)
        for _ in range(40):
            t = t - (medium.enthalpy(t, pressure) - h) / medium.at(t, pressure).heat_capacity_j_kg_k
        assert np.all(np.abs(t - goal) < 1e-6)


@EVERY
@settings(deadline=None, max_examples=40)
@given(
    temperature=st.floats(1.0, 6000.0),
    pressure=st.floats(1.0, 1e9),
)
def test_values_stay_finite_and_positive_far_beyond_the_limits(
    name: str, temperature: float, pressure: float
) -> None:
    """A solver that steps out of the limits meets finite, positive properties and a finite enthalpy."""
    medium = MEDIA[name][0]()
    t, p = np.full((CASES, 1), temperature), np.array(pressure)
    for label, values in _fields(medium.at(t, p)).items():
        assert np.all(np.isfinite(values)), label
        assert np.all(values > 0.0), label
    assert np.all(np.isfinite(medium.enthalpy(t, p)))


@EVERY
def test_enthalpy_rises_everywhere(name: str) -> None:
    """Enthalpy increases with temperature within the limits and far beyond them, with no step down."""
    medium, p = MEDIA[name][0](), MEDIA[name][3]
    t = np.linspace(20.0, 4000.0, 4000) * np.ones((CASES, 1))
    h = medium.enthalpy(t, np.array(p))
    assert np.all(np.diff(h, axis=1) > 0.0)
