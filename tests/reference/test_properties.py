"""Fluid properties against published and worked values."""

import tomllib
from collections.abc import Callable
from pathlib import Path
from typing import Any

import numpy as np
import pytest

from crossbank_service.properties import (
    GasMixture,
    MoistAir,
    PureSinglePhase,
    Saturation,
    State,
    combustion_products,
    humidity_ratio_from_relative_humidity,
    standard_pressure,
)
from crossbank_service.properties._gas_data import SPECIES, R

CASES = tomllib.loads((Path(__file__).parent / "properties_published.toml").read_text())["case"]


def _of_state(state: State) -> dict[str, float]:
    return {
        "density_kg_m3": float(state.density_kg_m3[0]),
        "heat_capacity_j_kg_k": float(state.heat_capacity_j_kg_k[0]),
        "conductivity_w_m_k": float(state.conductivity_w_m_k[0]),
        "viscosity_pa_s": float(state.viscosity_pa_s[0]),
    }


def _ideal_gas(gas: str, temperature_k: float) -> dict[str, float]:
    cp = SPECIES[gas].heat_capacity.over_r(np.array([temperature_k]))[0] * R
    return {"molar_heat_capacity_j_mol_k": float(cp)}


def _pure(name: str, phase: Any, temperature_k: float, pressure_pa: float) -> dict[str, float]:
    medium, t, p = PureSinglePhase(name, phase), np.array([temperature_k]), np.array([pressure_pa])
    return {**_of_state(medium.at(t, p)), "enthalpy_j_kg": float(medium.enthalpy(t, p)[0])}


def _saturation(name: str, pressure_pa: float) -> dict[str, float]:
    return {"temperature_k": float(Saturation(name).temperature(np.array([pressure_pa]))[0])}


def _saturation_at_temperature(name: str, temperature_k: float) -> dict[str, float]:
    p = Saturation(name).pressure(np.array([temperature_k]))
    return {"pressure_pa": float(p[0]), "latent_heat_j_kg": float(Saturation(name).at(p).latent_heat_j_kg[0])}


def _surface_tension(name: str, temperature_k: float) -> dict[str, float]:
    tension = Saturation(name).at(Saturation(name).pressure(np.array([temperature_k]))).surface_tension_n_m
    assert tension is not None
    return {"surface_tension_n_m": float(tension[0])}


def _saturated_air(temperature_k: float, pressure_pa: float) -> dict[str, float]:
    return {"humidity_ratio": float(humidity_ratio_from_relative_humidity(temperature_k, 1.0, pressure_pa))}


def _standard_pressure(elevation_m: float) -> dict[str, float]:
    return {"pressure_pa": float(standard_pressure(elevation_m))}


def _moist_air(humidity_ratio: float, temperature_k: float, pressure_pa: float) -> dict[str, float]:
    medium = MoistAir(np.array([humidity_ratio]))
    return _of_state(medium.at(np.array([temperature_k]), np.array([pressure_pa])))


def _gas_mixture(temperature_k: float, pressure_pa: float, **fractions: float) -> dict[str, float]:
    medium = GasMixture.of({name.removeprefix("y_"): y for name, y in fractions.items()})
    return _of_state(medium.at(np.array([temperature_k]), np.array([pressure_pa])))


def _combustion(**fuel: Any) -> dict[str, float]:
    products = combustion_products(**fuel)
    return {
        "stoichiometric_air_kg_kg": float(products.stoichiometric_air_kg_kg[0]),
        "flue_gas_kg_kg": float(products.flue_gas_kg_kg[0]),
        "molar_mass_kg_mol": float(products.molar_mass_kg_mol[0]),
        **{name: float(y[0]) for name, y in products.mole_fractions.items()},
    }


KINDS: dict[str, Callable[..., dict[str, float]]] = {
    "ideal_gas": _ideal_gas,
    "pure": _pure,
    "saturation": _saturation,
    "saturation_at_temperature": _saturation_at_temperature,
    "surface_tension": _surface_tension,
    "saturated_air": _saturated_air,
    "standard_pressure": _standard_pressure,
    "moist_air": _moist_air,
    "gas_mixture": _gas_mixture,
    "combustion": _combustion,
}


@pytest.mark.parametrize(
    "case", CASES, ids=lambda c: f"{c['kind']}-{'-'.join(map(str, c['inputs'].values()))}"
)
def test_published_values_are_met(case: dict[str, Any]) -> None:
    """Each value of the file is met within the tolerance it states."""
    found = KINDS[case["kind"]](**case["inputs"])
    for name, value in case["expected"].items():
        assert found[name] == pytest.approx(value, rel=case["relative"]), (name, case["source"])
