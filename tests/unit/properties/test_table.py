"""A caller's own points, and the interpolation they share with the metals."""

import math

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from crossbank_service.properties import Curve, Table, TablePoints

ONE = TablePoints(
    temperature_k=[313.7],
    density_kg_m3=[1.128],
    heat_capacity_j_kg_k=[1006.9],
    conductivity_w_m_k=[0.0271],
    viscosity_pa_s=[1.917e-5],
)
THREE = TablePoints(
    temperature_k=[300.0, 340.0, 420.0],
    density_kg_m3=[900.0, 880.0, 800.0],
    heat_capacity_j_kg_k=[2000.0, 2100.0, 2500.0],
    conductivity_w_m_k=[0.13, 0.12, 0.10],
    viscosity_pa_s=[1e-2, 1e-3, 1e-4],
)


@given(st.floats(50.0, 3000.0))
def test_one_point_is_constant_exactly(temperature: float) -> None:
    """A single point gives its own numbers bit for bit at any temperature, beside longer tables too."""
    for table in (Table.of([ONE], gas=False), Table.of([ONE, THREE], gas=False)):
        state = table.at(np.full((len(table.density_kg_m3), 1), temperature), np.array(1e5))
        assert state.density_kg_m3[0, 0] == 1.128
        assert state.heat_capacity_j_kg_k[0, 0] == 1006.9
        assert state.conductivity_w_m_k[0, 0] == 0.0271
        assert state.viscosity_pa_s[0, 0] == 1.917e-5


def test_between_points_by_hand() -> None:
    """Halfway: linear means, the geometric mean of the viscosities, the trapezoid's enthalpy."""
    table = Table.of([THREE], gas=False)
    t, p = np.array([[320.0, 380.0]]), np.array(1e5)
    state = table.at(t, p)
    assert np.allclose(state.density_kg_m3, [[890.0, 840.0]])
    assert np.allclose(state.heat_capacity_j_kg_k, [[2050.0, 2300.0]])
    assert np.allclose(state.viscosity_pa_s, [[math.sqrt(1e-5), math.sqrt(1e-7)]])
    first = 20.0 * 0.5 * (2000.0 + 2050.0)
    second = 40.0 * 2050.0 + 40.0 * 0.5 * (2100.0 + 2300.0)
    assert np.allclose(table.enthalpy(t, p), [[first, second]])


def test_outside_the_points_the_ends_hold() -> None:
    """Properties stay at the end values and the enthalpy goes on with the end's heat capacity."""
    table = Table.of([THREE], gas=False)
    t, p = np.array([[250.0, 500.0]]), np.array(1e5)
    state = table.at(t, p)
    assert np.array_equal(state.density_kg_m3, [[900.0, 800.0]])
    last = 40.0 * 2050.0 + 80.0 * 2300.0
    assert np.allclose(table.enthalpy(t, p), [[-50.0 * 2000.0, last + 80.0 * 2500.0]])


def test_a_caller_s_enthalpy_is_linear_between_his_points() -> None:
    """Given enthalpies are taken as they are, beside a case whose enthalpies are integrated."""
    given_points = TablePoints(
        temperature_k=THREE.temperature_k,
        density_kg_m3=THREE.density_kg_m3,
        heat_capacity_j_kg_k=THREE.heat_capacity_j_kg_k,
        conductivity_w_m_k=THREE.conductivity_w_m_k,
        viscosity_pa_s=THREE.viscosity_pa_s,
        enthalpy_j_kg=[1000.0, 85000.0, 265000.0],
    )
    table = Table.of([given_points, THREE], gas=False)
    t = np.array([[300.0, 320.0, 420.0, 430.0]] * 2)
    h = table.enthalpy(t, np.array(1e5))
    assert np.allclose(h[0], [1000.0, 43000.0, 265000.0, 265000.0 + 25000.0])
    assert h[1, 1] == pytest.approx(40500.0)


def test_gas_density_follows_the_pressure_only_where_one_was_given() -> None:
    """Density scales with p over the table's pressure for a gas; without one, and for liquids, it stays."""
    with_pressure = TablePoints(
        temperature_k=[300.0],
        density_kg_m3=[2.0],
        heat_capacity_j_kg_k=[1000.0],
        conductivity_w_m_k=[0.02],
        viscosity_pa_s=[2e-5],
        pressure_pa=2e5,
    )
    t, p = np.full((2, 1), 300.0), np.array([[1e5], [1e5]])
    density = Table.of([with_pressure, ONE], gas=True).at(t, p).density_kg_m3
    assert np.array_equal(density, [[1.0], [1.128]])
    assert Table.of([with_pressure], gas=False).at(t[:1], p[:1]).density_kg_m3[0, 0] == 2.0


@given(
    st.lists(st.floats(1.0, 1e3), min_size=1, max_size=9, unique=True).map(sorted),
    st.floats(-1e3, 3e3),
)
def test_curve_equals_the_plain_interpolation(x: list[float], at: float) -> None:
    """A padded curve equals NumPy's interpolation of that curve alone."""
    y = [math.sin(v) for v in x]
    curves = Curve.of([(x, y), ([0.0, 1.0], [5.0, 6.0]), (list(range(12)), list(range(12)))])
    ours = curves(np.full((3, 1), at))[0, 0]
    assert ours == pytest.approx(np.interp(at, x, y), rel=1e-9, abs=1e-9)


def test_constant_curves_hold_their_value() -> None:
    """Curves built from plain numbers give them back, and cases can be taken."""
    curve = Curve.constant(np.array([15.0, 60.0]))
    t = np.array([[300.0, 900.0], [300.0, 900.0]])
    assert np.array_equal(curve(t), [[15.0, 15.0], [60.0, 60.0]])
    assert np.array_equal(curve.take(np.array([1]))(t[:1]), [[60.0, 60.0]])
