"""Vapour condensing inside the tubes: quality march, film, pressure and with it the saturation temperature.

Every row takes the vapour that it condenses: its flow is its heat over the enthalpy between the inlet and its own
condensate. A superheated inlet adds to the enthalpy only: the wall is below saturation, so it condenses vapour
along its whole length (wet-wall rule) and the film is driven by saturation less wall temperature from the inlet on.
"""

from dataclasses import dataclass

import numpy as np

from crossbank_service.banks import TubeBank
from crossbank_service.methods.inside_two_phase_drop import momentum_flux, rouhani_axelsson_void
from crossbank_service.methods.record import Method
from crossbank_service.properties import PureSinglePhase, SaturatedState, Saturation
from crossbank_service.rating._arrays import Array, Cases, spread
from crossbank_service.rating._outside import evaluate

UNKNOWN_SURFACE_TENSION = 0.02
"""Taken where a fluid has no equation for it [N/m]; only the void fraction behind the momentum term uses it."""


@dataclass(frozen=True)
class CondensingStream(Cases):
    """The vapour of N cases; arrays (N,), SI.

    Attributes
    ----------
    saturation : Saturation
    inlet_pressure : Array
        In the inlet header [Pa].
    superheat : Array
        Of the inlet over its saturation temperature [K].
    inlet_enthalpy, inlet_density : Array
        Of the (superheated) inlet vapour, on the zero of the saturation tables [J/kg], [kg/m3].
    fouling : Array
        On the bore [m2 K/W].
    loss_heads : Array
        Velocity heads lost at the entry.
    heat_method, drop_method : Method
    """

    saturation: Saturation
    inlet_pressure: Array
    superheat: Array
    inlet_enthalpy: Array
    inlet_density: Array
    fouling: Array
    loss_heads: Array
    hydrocarbon: Array
    heat_method: Method
    drop_method: Method


@dataclass(frozen=True)
class CondensingFilm(Cases):
    """Film and state in every cell, (N, rows, segments) unless said otherwise.

    ``temperature`` is saturation at the local pressure [K]; ``pressure`` that at the middle of each cell [Pa];
    ``outlet_pressure``, ``flow``, ``flux`` (N, rows).
    """

    coefficient: Array
    temperature: Array
    quality: Array
    pressure: Array
    outlet_pressure: Array
    flow: Array
    flux: Array
    liquid_density: Array
    vapour_viscosity: Array


def entering_enthalpy(
    fluid: str, saturation: Saturation, pressure: Array, superheat: Array
) -> tuple[Array, Array]:
    """Enthalpy [J/kg] and density [kg/m3] of the inlet vapour on the zero of the saturation tables, (N,)."""
    at = saturation.at(pressure)
    vapour = PureSinglePhase(fluid, "gas")
    hot = at.temperature_k + superheat
    rise = vapour.enthalpy(hot, pressure) - vapour.enthalpy(at.temperature_k, pressure)
    dry = superheat <= 0.0
    density = np.where(dry, at.vapour_density_kg_m3, vapour.at(hot, pressure).density_kg_m3)
    return at.vapour_enthalpy_j_kg + np.where(dry, 0.0, rise), density


def film(
    bank: TubeBank,
    stream: CondensingStream,
    heat: Array,
    face: Array,
    pressure: Array,
) -> CondensingFilm:
    """Film and pressure for the heat that the cells gave off last.

    Parameters
    ----------
    heat : Array (N, rows, segments)
        Heat to the outside stream [W].
    face : Array (N, rows, segments)
        Temperature of the surface the condensate touches [K].
    pressure : Array (N, rows, segments)
        Last known pressure in the middle of each cell [Pa].
    """
    n, rows, segments = heat.shape
    given = np.maximum(heat, 0.0)
    row_heat = given.sum(axis=2)
    # transport properties follow the row's mean pressure, the saturation temperature every cell's own
    sat = stream.saturation.at(pressure.mean(axis=2))
    per_kg = np.maximum(stream.inlet_enthalpy[:, None] - sat.liquid_enthalpy_j_kg, 1.0)
    flow = row_heat / per_kg
    flux = flow / (bank.tubes_per_row * bank.bore_section)[:, None]

    share = np.cumsum(given, axis=2) / np.maximum(row_heat, 1e-300)[:, :, None]
    share = np.concatenate([np.zeros((n, rows, 1)), share], axis=2)
    excess = (per_kg / sat.latent_heat_j_kg)[:, :, None]
    ends = np.clip(excess * (1.0 - share), 0.0, 1.0)
    quality = 0.5 * (ends[:, :, 1:] + ends[:, :, :-1])

    temperature = stream.saturation.temperature(pressure)
    values = local_values(bank, stream, sat, quality, flux[:, :, None], temperature - face)
    coefficient = evaluate(stream.heat_method, values)
    gradient = evaluate(stream.drop_method, values)
    step = gradient * spread(bank.tube_length, heat) / segments
    before = np.concatenate([np.zeros((n, rows, 1)), np.cumsum(step, axis=2)], axis=2)
    momentum = _momentum(sat, ends, flux)
    inlet = stream.loss_heads[:, None] * flux**2 / (2.0 * stream.inlet_density[:, None])
    lost = inlet[:, :, None] + before + momentum - momentum[:, :, :1]
    at_ends = stream.inlet_pressure[:, None, None] - lost
    floor = 0.1 * stream.inlet_pressure[:, None, None]
    at_ends = np.maximum(at_ends, floor)
    return CondensingFilm(
        coefficient=coefficient,
        temperature=temperature,
        quality=quality,
        pressure=0.5 * (at_ends[:, :, 1:] + at_ends[:, :, :-1]),
        outlet_pressure=at_ends[:, :, -1],
        flow=flow,
        flux=flux,
        liquid_density=sat.liquid_density_kg_m3,
        vapour_viscosity=sat.vapour_viscosity_pa_s,
    )


def local_values(
    bank: TubeBank,
    stream: CondensingStream,
    sat: SaturatedState,
    quality: Array,
    flux: Array,
    difference: Array,
) -> dict[str, Array]:
    """Everything a condensing method may ask for, from row properties (N, rows) and cell states."""
    row = (..., None)
    return {
        "mass_flux_kg_m2_s": flux,
        "diameter_m": spread(bank.bore, quality),
        "hydrocarbon": spread(stream.hydrocarbon, quality),
        "temperature_difference_k": np.maximum(difference, 1e-6),
        "quality": quality,
        "liquid_density_kg_m3": sat.liquid_density_kg_m3[row],
        "vapour_density_kg_m3": sat.vapour_density_kg_m3[row],
        "liquid_viscosity_pa_s": sat.liquid_viscosity_pa_s[row],
        "vapour_viscosity_pa_s": sat.vapour_viscosity_pa_s[row],
        "liquid_conductivity_w_m_k": sat.liquid_conductivity_w_m_k[row],
        "liquid_heat_capacity_j_kg_k": sat.liquid_heat_capacity_j_kg_k[row],
        "latent_heat_j_kg": sat.latent_heat_j_kg[row],
        "surface_tension_n_m": surface_tension(sat)[row],
        "reduced_pressure": sat.reduced_pressure[row],
    }


def surface_tension(sat: SaturatedState) -> Array:
    """Surface tension [N/m]; a common organic value where the fluid has no equation for it."""
    if sat.surface_tension_n_m is None:
        return np.full_like(sat.temperature_k, UNKNOWN_SURFACE_TENSION)
    return sat.surface_tension_n_m


def _momentum(sat: SaturatedState, quality: Array, flux: Array) -> Array:
    """Momentum flux of the two-phase stream at the cell ends [Pa], with the Rouhani-Axelsson void fraction."""
    row = (..., None)
    densities = {
        "liquid_density_kg_m3": sat.liquid_density_kg_m3[row],
        "vapour_density_kg_m3": sat.vapour_density_kg_m3[row],
    }
    void = rouhani_axelsson_void(
        quality=quality,
        mass_flux_kg_m2_s=flux[row],
        surface_tension_n_m=surface_tension(sat)[row],
        **densities,
    )
    return momentum_flux(quality=quality, mass_flux_kg_m2_s=flux[row], void_fraction=void, **densities)
