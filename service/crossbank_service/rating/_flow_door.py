"""Flow and pressure of the outside stream at the door, as one mass flow and one absolute pressure."""

import numpy as np

from crossbank.contract import (
    ActualVolume,
    ApproachVelocity,
    DryMass,
    Mass,
    Outside,
    ReferenceVolume,
    given,
)
from crossbank_service.properties import GAS_CONSTANT, psychrometrics
from crossbank_service.rating import _fluid_door
from crossbank_service.rating._case import FluidInput
from crossbank_service.rating._composition import composition_of
from crossbank_service.rating._faults import Faults
from crossbank_service.rating._fluids import medium_of

LEAST_PRESSURE_PA = 1e3


def outside_pressure(outside: Outside, faults: Faults) -> float:
    """Absolute pressure at the inlet [Pa]: as written, or of the standard atmosphere with the gauge reading on top."""
    gauge, pointer = outside.inlet_gauge_pressure_pa, "/outside/inlet_gauge_pressure_pa"
    if outside.inlet_pressure_pa is not None:
        if gauge is not None:
            faults.reject(
                pointer,
                "inlet_pressure_pa is absolute already; a gauge pressure goes with elevation_m.",
                gauge,
            )
        return outside.inlet_pressure_pa
    atmosphere = float(psychrometrics.standard_pressure(given(outside.elevation_m)))
    pressure = atmosphere + (gauge or 0.0)
    if pressure < LEAST_PRESSURE_PA:
        faults.refuse(
            pointer,
            f"Below the atmosphere of {atmosphere:.0f} Pa at {given(outside.elevation_m):g} m this leaves "
            f"{pressure:.0f} Pa absolute; at least {LEAST_PRESSURE_PA:g} Pa are needed.",
            gauge,
            "Pa",
            at_least=LEAST_PRESSURE_PA - atmosphere,
        )
        return LEAST_PRESSURE_PA
    return pressure


def mass_flow(
    outside: Outside, fluid: FluidInput, pressure: float, face_area: float, faults: Faults
) -> float:
    """Mass flow with its moisture [kg/s]; ``face_area`` [m2] of the empty duct."""
    flow = outside.flow
    match flow:
        case Mass():
            return flow.kg_s
        case DryMass():
            humidity = _humidity(fluid, "/outside/flow/kind", "mass", faults)
            return flow.kg_s * (1.0 + humidity)
        case ReferenceVolume(basis="dry"):
            humidity = _humidity(fluid, "/outside/flow/basis", "wet", faults)
            found = composition_of(fluid)
            dry = found.dry_molar_mass if found else 0.0
            density = flow.reference_pressure_pa * dry / (GAS_CONSTANT * flow.reference_temperature_k)
            return flow.m3_s * density * (1.0 + humidity)
        case ReferenceVolume():
            at, low = flow.reference_temperature_k, flow.reference_pressure_pa
            checked = _fluid_door.reference_state(fluid, at, low)
            if checked is not None:
                faults.refuse("/outside/flow/reference_temperature_k", checked, at, "K")
                return 0.0
            return flow.m3_s * _density(fluid, at, low)
        case ActualVolume():
            return flow.m3_s * _density(fluid, outside.inlet_temperature_k, pressure)
        case ApproachVelocity():
            return flow.m_s * face_area * _density(fluid, outside.inlet_temperature_k, pressure)


def _density(fluid: FluidInput, temperature: float, pressure: float) -> float:
    state = medium_of([fluid]).at(np.array([temperature]), np.array([pressure]))
    return float(state.density_kg_m3[0])


def _humidity(fluid: FluidInput, pointer: str, instead: str, faults: Faults) -> float:
    """Humidity ratio of a gas that has a dry part; a fault where it has none."""
    found = composition_of(fluid)
    if found is not None and found.humidity_ratio is not None:
        return found.humidity_ratio
    faults.refuse(
        pointer,
        "A dry flow goes with moist air, gas mixtures and combustion gas that have a dry part; this fluid has none "
        f"told apart from its vapour: write '{instead}'.",
        "dry-mass" if instead == "mass" else "dry",
    )
    return 0.0
