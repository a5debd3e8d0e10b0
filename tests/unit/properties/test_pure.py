"""Pure fluids in one phase against their reference equations and the industrial water formulation."""

import contextlib
import threading

import CoolProp
import numpy as np
import pytest
from CoolProp.CoolProp import AbstractState
from iapws import IAPWS97

from crossbank_service.properties import FLUIDS, PureSinglePhase, phase_at, pure_limits
from crossbank_service.properties import _pure_tables as tables
from crossbank_service.properties.medium import Array
from crossbank_service.properties.pure import STATED_ERRORS

CONDENSABLE = [slug for slug, f in FLUIDS.items() if not f.supercritical_only]


def _errors(slug: str, phase: str, t: Array, p: Array) -> dict[str, Array]:
    """Relative deviations from the reference equations; states without transport values are left out."""
    state = AbstractState("HEOS", FLUIDS[slug].equation)
    critical = state.T_critical()
    rows = []
    for one_t, one_p in zip(t, p, strict=True):
        if one_t < critical:
            state.specify_phase(CoolProp.iphase_gas if phase == "gas" else CoolProp.iphase_liquid)
        else:
            state.specify_phase(CoolProp.iphase_supercritical_gas)
        state.update(CoolProp.PT_INPUTS, one_p, one_t)
        row = [state.rhomass(), state.cpmass(), np.nan, np.nan, state.hmass()]
        with contextlib.suppress(ValueError):
            row[2], row[3] = state.viscosity(), state.conductivity()
        rows.append(row)
    reference = np.array(rows).T
    medium = PureSinglePhase(slug, "gas" if phase == "gas" else "liquid")
    ours = medium.at(t, p)
    h = medium.enthalpy(t, p)
    deviations = {
        "density": ours.density_kg_m3 / reference[0] - 1.0,
        "heat_capacity": ours.heat_capacity_j_kg_k / reference[1] - 1.0,
        "viscosity": ours.viscosity_pa_s / reference[2] - 1.0,
        "conductivity": ours.conductivity_w_m_k / reference[3] - 1.0,
        "enthalpy": (h - reference[4]) / (100.0 * reference[1]),
    }
    return {name: np.abs(d[~np.isnan(d)]) for name, d in deviations.items()}


def _states(slug: str, phase: str) -> tuple[Array, Array]:
    """Random states over the whole of a phase's tables."""
    rng = np.random.default_rng(len(slug))
    limits, count = pure_limits(slug), 60
    gas = tables.gas_table(slug)
    top = limits.liquid_highest_temperature_k
    if phase == "liquid":
        assert top is not None
        assert gas.saturation is not None
        t = rng.uniform(limits.lowest_temperature_k, top, count)
        floor = gas.saturation.pressure(t) * 1.0001
        return t, floor + (limits.highest_pressure_pa - floor) * rng.uniform(0.0, 1.0, count) ** 3
    spans = []
    if top is not None:
        spans += [(limits.lowest_temperature_k, top), (top, min(gas.bridge_top_k, gas.highest_k))]
    if gas.hot is not None:
        spans.append((max(gas.bridge_top_k, gas.lowest_k), gas.highest_k))
    t = np.concatenate([rng.uniform(low, high, count) for low, high in spans])
    most = np.minimum(gas.limit(t), limits.highest_pressure_pa)
    return t, most * rng.uniform(1e-5, 0.9999, t.size)


@pytest.mark.parametrize("slug", FLUIDS)
def test_gas_repeats_the_reference_equations_within_the_stated_error(slug: str) -> None:
    """Random gas states: 95 % within the typical error and all within the worst."""
    for name, errors in _errors(slug, "gas", *_states(slug, "gas")).items():
        typical, worst = STATED_ERRORS["gas"][name]
        assert np.percentile(errors, 95) < typical, name
        assert errors.max() < worst, name


@pytest.mark.parametrize("slug", CONDENSABLE)
def test_liquid_repeats_the_reference_equations_within_the_stated_error(slug: str) -> None:
    """Random liquid states: 95 % within the typical error and all within the worst."""
    for name, errors in _errors(slug, "liquid", *_states(slug, "liquid")).items():
        typical, worst = STATED_ERRORS["liquid"][name]
        assert np.percentile(errors, 95) < typical, name
        assert errors.max() < worst, name


@pytest.mark.parametrize(
    ("temperature", "pressure", "phase"),
    [
        (280.0, 2e5, "liquid"),
        (330.0, 1e6, "liquid"),
        (400.0, 5e6, "liquid"),
        (550.0, 20e6, "liquid"),
        (380.0, 1e5, "gas"),
        (480.0, 1e6, "gas"),
        (620.0, 8e6, "gas"),
        (900.0, 20e6, "gas"),
    ],
)
def test_water_agrees_with_the_industrial_formulation(
    temperature: float, pressure: float, phase: str
) -> None:
    """Water and steam agree with an independent coding of IAPWS-IF97 as far as the formulations do."""
    reference = IAPWS97(T=temperature, P=pressure * 1e-6)
    assert phase_at("water", temperature, pressure) == phase
    medium = PureSinglePhase("water", "gas" if phase == "gas" else "liquid")
    t, p = np.array([temperature]), np.array([pressure])
    state = medium.at(t, p)
    assert state.density_kg_m3[0] == pytest.approx(reference.rho, rel=3e-4)
    assert state.heat_capacity_j_kg_k[0] == pytest.approx(reference.cp * 1e3, rel=3e-3)
    assert state.viscosity_pa_s[0] == pytest.approx(reference.mu, rel=2e-3)
    assert state.conductivity_w_m_k[0] == pytest.approx(reference.k, rel=5e-3)
    assert medium.enthalpy(t, p)[0] == pytest.approx(reference.h * 1e3, rel=3e-4, abs=200.0)


@pytest.mark.parametrize(
    ("slug", "temperature", "pressure", "phase"),
    [
        ("water", 300.0, 1e5, "liquid"),
        ("water", 400.0, 1e5, "gas"),
        ("water", 640.0, 2.3e7, "near-critical"),
        ("water", 900.0, 3e7, "gas"),
        ("water", 260.0, 1e5, "too-cold"),
        ("water", 2100.0, 1e5, "too-hot"),
        ("water", 300.0, 9e7, "pressure-too-high"),
        ("carbon-dioxide", 310.0, 9e6, "near-critical"),
        ("carbon-dioxide", 400.0, 1e7, "gas"),
        ("carbon-dioxide", 260.0, 5e6, "liquid"),
        ("nitrogen", 300.0, 1e7, "gas"),
        ("propane", 280.0, 1e6, "liquid"),
    ],
)
def test_phase_is_told_from_the_state(slug: str, temperature: float, pressure: float, phase: str) -> None:
    """Liquid, gas, or why neither."""
    assert phase_at(slug, temperature, pressure) == phase


def test_a_gas_below_saturation_keeps_the_saturated_properties() -> None:
    """Steam asked below its saturation temperature holds the saturated state and extends the enthalpy."""
    steam, p = PureSinglePhase("water", "gas"), np.array([1e5])
    saturation = 372.7559
    at, below = steam.at(np.array([saturation]), p), steam.at(np.array([saturation - 20.0]), p)
    assert below.density_kg_m3[0] == pytest.approx(at.density_kg_m3[0], rel=1e-5)
    drop = steam.enthalpy(np.array([saturation]), p) - steam.enthalpy(np.array([saturation - 20.0]), p)
    assert drop[0] == pytest.approx(20.0 * at.heat_capacity_j_kg_k[0], rel=1e-5)


def test_tables_meet_without_a_step() -> None:
    """Where one table hands over to the next, enthalpy steps by less than 1e-5 of 100 K of heat capacity."""
    for slug in ("water", "propane", "carbon-dioxide", "r134a"):
        gas = tables.gas_table(slug)
        medium = PureSinglePhase(slug, "gas")
        for edge in (gas.vapour_top_k, gas.bridge_top_k):
            p = np.linspace(0.01, 0.95, 7) * gas.limit(np.array([edge]))
            low, high = np.full(7, np.nextafter(edge, 0.0)), np.full(7, np.nextafter(edge, np.inf))
            scale = 100.0 * medium.at(low, p).heat_capacity_j_kg_k
            assert np.all(np.abs(medium.enthalpy(high, p) - medium.enthalpy(low, p)) < 1e-5 * scale)


def test_one_table_is_built_however_many_threads_ask() -> None:
    """Threads that ask at once all get the same table."""
    found: list[object] = []
    threads = [threading.Thread(target=lambda: found.append(tables.gas_table("isobutane"))) for _ in range(6)]
    for thread in threads:
        thread.start()
    for thread in threads:
        thread.join()
    assert len(found) == 6
    assert len({id(table) for table in found}) == 1


def test_unknown_names_are_refused_with_the_known_ones() -> None:
    """A fluid that is not there is refused, naming it and what there is; so is a phase."""
    with pytest.raises(KeyError, match=r"unobtainium.*ammonia"):
        PureSinglePhase("unobtainium", "gas")
    with pytest.raises(ValueError, match="liquid"):
        PureSinglePhase("water", "solid")  # type: ignore[arg-type]
