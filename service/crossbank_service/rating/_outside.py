"""The outside stream: film coefficients and pressure drop of the rows it crosses."""

from dataclasses import dataclass

import numpy as np

from crossbank_service.banks import TubeBank
from crossbank_service.methods.record import Method
from crossbank_service.properties import Medium
from crossbank_service.rating._arrays import Array, Cases, spread

LEAST_HALF_STEP_K = 0.05

Values = dict[str, Array]


def evaluate(method: Method, values: Values) -> Array:
    """A method's value from a set of named quantities that holds at least its inputs."""
    names = (*method.inputs, *(name for name in method.options if name in values))
    return method.function(**{name: values[name] for name in names})


@dataclass(frozen=True)
class OutsideStream(Cases):
    """The outside stream of N cases and the methods that rate it; arrays (N,), SI.

    Attributes
    ----------
    medium : Medium
    mass_flow, inlet_temperature, inlet_pressure, fouling : Array
        [kg/s], [K], [Pa], [m2 K/W]
    heat_method, drop_method : Method
    """

    medium: Medium
    mass_flow: Array
    inlet_temperature: Array
    inlet_pressure: Array
    fouling: Array
    heat_method: Method
    drop_method: Method


@dataclass(frozen=True)
class OutsideFilm(Cases):
    """Film coefficient [W/(m2 K)] and what it was evaluated at."""

    coefficient: Array
    reynolds: Array
    prandtl: Array


@dataclass(frozen=True)
class OutsideDrop(Cases):
    """Pressure along the rows: friction and momentum parts (N, rows) [Pa], row density [kg/m3], pressures.

    ``pressure`` is that at the inlet of each row with the outlet of the last one behind it, (N, rows + 1).
    """

    friction: Array
    momentum: Array
    density: Array
    loss_coefficient: Array
    reynolds: Array
    pressure: Array


def layout_values(bank: TubeBank, medium: Medium, like: Array) -> Values:
    """The quantities of the nomenclature that a bank and a fluid's kind decide, shaped against ``like``."""
    return {
        "arrangement": spread(bank.staggered, like),
        "transverse_pitch_ratio": spread(bank.a, like),
        "longitudinal_pitch_ratio": spread(bank.b, like),
        "rows": spread(bank.rows, like),
        "gas": np.full((like.shape[0],) + (1,) * (like.ndim - 1), float(medium.gas)),
    }


def mass_flux(bank: TubeBank, stream: OutsideStream) -> Array:
    """Mass flux in the narrowest section [kg/(m2 s)], (N,)."""
    return stream.mass_flow / bank.free_area


def film_values(bank: TubeBank, stream: OutsideStream, bulk: Array, face: Array, pressure: Array) -> Values:
    """Everything an outside heat transfer method may ask for, at given bulk and surface temperatures."""
    flux, d = spread(mass_flux(bank, stream), bulk), spread(bank.outer_diameter, bulk)
    method = stream.heat_method
    at_film = method.properties_at == "film"
    here = stream.medium.at(0.5 * (bulk + face) if at_film else bulk, pressure)
    values = layout_values(bank, stream.medium, bulk)
    values["reynolds"] = flux * d / here.viscosity_pa_s
    values["prandtl"] = here.prandtl
    values["conductivity"] = here.conductivity_w_m_k
    if not at_film and "prandtl_wall" in method.options:
        values["prandtl_wall"] = stream.medium.at(face, pressure).prandtl
    values["temperature_ratio"] = bulk / face
    return values


def film(
    bank: TubeBank, stream: OutsideStream, bulk: Array, face: Array, pressure: Array, row: Array | None
) -> OutsideFilm:
    """Film coefficient at bulk and surface temperatures.

    Parameters
    ----------
    bulk, face, pressure : Array (N, ...)
        [K], [K], [Pa]; face is the surface the fluid touches.
    row : Array or None
        Row of each place, counted from 1 (broadcasts against ``bulk``); None gives the mean over the rows.
    """
    values = film_values(bank, stream, bulk, face, pressure)
    method = stream.heat_method
    nusselt = evaluate(method, values)
    if row is not None and method.row_share is not None:
        names = (*method.inputs, *(name for name in method.options if name in values))
        nusselt = nusselt * method.row_share(row=row, **{name: values[name] for name in names})
    h = nusselt * values["conductivity"] / spread(bank.outer_diameter, bulk)
    return OutsideFilm(
        h, np.broadcast_to(values["reynolds"], h.shape), np.broadcast_to(values["prandtl"], h.shape)
    )


def drop(
    bank: TubeBank,
    stream: OutsideStream,
    bulk: Array,
    face: Array,
    ends: Array,
    pressure: Array,
) -> OutsideDrop:
    """Pressure drop row by row.

    Parameters
    ----------
    bulk, face : Array (N, rows)
        Mean bulk and surface temperature of each row [K].
    ends : Array (N, rows + 1)
        Temperature entering each row and leaving the last [K].
    pressure : Array (N, rows + 1)
        Last known pressures at the same places [Pa].

    Notes
    -----
    Each row takes an even share of the bank's resistances, friction = xi G_max^2/(2 rho) at the row's density;
    momentum is that of the empty duct, G_face^2 (1/rho_out - 1/rho_in), so that the parts add up duct to duct.
    """
    flux = spread(mass_flux(bank, stream), bulk)
    middle = 0.5 * (pressure[:, 1:] + pressure[:, :-1])
    here = stream.medium.at(bulk, middle)
    at_ends = stream.medium.at(ends, pressure).density_kg_m3
    values = layout_values(bank, stream.medium, bulk)
    values["reynolds"] = flux * spread(bank.outer_diameter, bulk) / here.viscosity_pa_s
    if "viscosity_ratio" in stream.drop_method.options:
        values["viscosity_ratio"] = stream.medium.at(face, middle).viscosity_pa_s / here.viscosity_pa_s
    loss = evaluate(stream.drop_method, values)
    heads = flux**2 / (2.0 * here.density_kg_m3)
    friction = loss * heads * resistances(bank, stream, bulk) / spread(bank.rows, bulk)
    face_flux = spread(stream.mass_flow / bank.face_area, bulk)
    momentum = face_flux**2 * (1.0 / at_ends[:, 1:] - 1.0 / at_ends[:, :-1])
    along = np.concatenate([np.zeros((bulk.shape[0], 1)), np.cumsum(friction + momentum, axis=1)], axis=1)
    # a pressure below a tenth of the inlet's is no state of a bank; the floor keeps the iteration finite
    floor = 0.1 * stream.inlet_pressure[:, None]
    return OutsideDrop(
        friction=friction,
        momentum=momentum,
        density=here.density_kg_m3,
        loss_coefficient=loss,
        reynolds=values["reynolds"],
        pressure=np.maximum(stream.inlet_pressure[:, None] - along, floor),
    )


def resistances(bank: TubeBank, stream: OutsideStream, like: Array) -> Array:
    """Row resistances the pressure drop method counts, shaped against ``like``."""
    count = stream.drop_method.resistances
    if count is None:
        return spread(bank.rows, like)
    values = layout_values(bank, stream.medium, like)
    names = ("arrangement", "transverse_pitch_ratio", "longitudinal_pitch_ratio", "rows")
    return np.asarray(count(**{name: values[name] for name in names}))


def secant_heat_capacity(medium: Medium, first: Array, second: Array, pressure: Array) -> Array:
    """Heat capacity that carries the enthalpy between two temperatures exactly [J/(kg K)].

    Steps too small to divide by are widened about their middle, so that the value stays the slope of the enthalpy.
    """
    middle, half = 0.5 * (first + second), 0.5 * (second - first)
    half = np.where(np.abs(half) < LEAST_HALF_STEP_K, LEAST_HALF_STEP_K, half)
    rise = medium.enthalpy(middle + half, pressure) - medium.enthalpy(middle - half, pressure)
    return np.asarray(rise / (2.0 * half))


def temperature_of(medium: Medium, enthalpy: Array, start: Array, pressure: Array) -> Array:
    """Temperature of a given enthalpy by Newton's method from a near start [K]."""
    t = start
    for _ in range(3):
        t = t + (enthalpy - medium.enthalpy(t, pressure)) / medium.at(t, pressure).heat_capacity_j_kg_k
    return t
