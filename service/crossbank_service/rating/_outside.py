"""The outside stream: film coefficients and pressure drop of the rows it crosses."""

from dataclasses import dataclass

import numpy as np

from crossbank_service.methods.record import Method
from crossbank_service.properties import Medium
from crossbank_service.rating._arrays import Array, Cases, spread
from crossbank_service.rating._section import Section

LEAST_HALF_STEP_K = 0.05

Values = dict[str, Array]


def evaluate(method: Method, values: Values) -> Array:
    """A method's value from a set of named quantities that holds at least its inputs."""
    names = (*method.inputs, *(name for name in method.options if name in values))
    return method.function(**{name: values[name] for name in names})


@dataclass(frozen=True)
class OutsideStream(Cases):
    """The outside stream of N cases; arrays (N,), SI.

    Attributes
    ----------
    medium : Medium
    mass_flow, inlet_temperature, inlet_pressure, fouling : Array
        [kg/s], [K], [Pa], [m2 K/W]
    """

    medium: Medium
    mass_flow: Array
    inlet_temperature: Array
    inlet_pressure: Array
    fouling: Array


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


def layout_values(section: Section, medium: Medium, like: Array) -> Values:
    """The quantities of the nomenclature that a surface and a fluid's kind decide, shaped against ``like``."""
    bank = section.bank
    values = {
        "arrangement": spread(bank.staggered, like),
        "transverse_pitch_ratio": spread(bank.a, like),
        "longitudinal_pitch_ratio": spread(bank.b, like),
        "rows": spread(bank.rows, like),
        "gas": np.full((like.shape[0],) + (1,) * (like.ndim - 1), float(medium.gas)),
    }
    return values if bank.fins is None else {**values, **section.fin_values(like)}


def mass_flux(section: Section, stream: OutsideStream) -> Array:
    """Mass flux in the narrowest section [kg/(m2 s)], (N,)."""
    return stream.mass_flow / section.bank.free_area


def film_values(
    section: Section, stream: OutsideStream, bulk: Array, face: Array, pressure: Array, fin: Array
) -> Values:
    """Everything an outside heat transfer method may ask for, at given bulk, surface and fin temperatures."""
    flux, d = spread(mass_flux(section, stream), bulk), spread(section.bank.root_diameter, bulk)
    method = section.heat_method
    at_film = method.properties_at == "film"
    here = stream.medium.at(0.5 * (bulk + face) if at_film else bulk, pressure)
    values = layout_values(section, stream.medium, bulk)
    values["reynolds"] = flux * d / here.viscosity_pa_s
    values["prandtl"] = here.prandtl
    values["conductivity"] = here.conductivity_w_m_k
    if not at_film and "prandtl_wall" in method.options:
        values["prandtl_wall"] = stream.medium.at(face, pressure).prandtl
    values["temperature_ratio"] = bulk / face
    values["gas_temperature_k"] = bulk
    values["fin_temperature_k"] = fin
    return values


def film(
    section: Section,
    stream: OutsideStream,
    bulk: Array,
    face: Array,
    pressure: Array,
    fin: Array,
    row: Array | None,
) -> OutsideFilm:
    """Film coefficient of the rows of one surface at bulk and surface temperatures.

    Parameters
    ----------
    bulk, face, pressure, fin : Array (N, ...)
        [K], [K], [Pa], [K]; ``face`` is the mean surface the fluid touches, ``fin`` the mean of the fins.
    row : Array or None
        Row of each place, counted from 1 (broadcasts against ``bulk``); None gives the mean over the rows.
    """
    values = film_values(section, stream, bulk, face, pressure, fin)
    method = section.heat_method
    nusselt = evaluate(method, values)
    if row is not None and method.row_share is not None:
        names = (*method.inputs, *(name for name in method.options if name in values))
        nusselt = nusselt * method.row_share(row=row, **{name: values[name] for name in names})
    h = nusselt * values["conductivity"] / spread(section.bank.root_diameter, bulk)
    return OutsideFilm(
        h, np.broadcast_to(values["reynolds"], h.shape), np.broadcast_to(values["prandtl"], h.shape)
    )


def drop(
    sections: tuple[Section, ...],
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
    middle = 0.5 * (pressure[:, 1:] + pressure[:, :-1])
    density = stream.medium.at(bulk, middle).density_kg_m3
    at_ends = stream.medium.at(ends, pressure).density_kg_m3
    parts = [_friction(each, stream, bulk, face, middle) for each in sections]
    loss, reynolds, friction = (np.concatenate(part, axis=1) for part in zip(*parts, strict=True))
    face_flux = spread(stream.mass_flow / sections[0].bank.face_area, bulk)
    momentum = face_flux**2 * (1.0 / at_ends[:, 1:] - 1.0 / at_ends[:, :-1])
    along = np.concatenate([np.zeros((bulk.shape[0], 1)), np.cumsum(friction + momentum, axis=1)], axis=1)
    # a pressure below a tenth of the inlet's is no state of a bank; the floor keeps the iteration finite
    floor = 0.1 * stream.inlet_pressure[:, None]
    return OutsideDrop(
        friction=friction,
        momentum=momentum,
        density=density,
        loss_coefficient=loss,
        reynolds=reynolds,
        pressure=np.maximum(stream.inlet_pressure[:, None] - along, floor),
    )


def _friction(
    section: Section, stream: OutsideStream, bulk: Array, face: Array, pressure: Array
) -> tuple[Array, Array, Array]:
    """Loss coefficient, Reynolds number and friction [Pa] of the rows of one surface."""
    here_rows = section.rows
    bulk, face, pressure = bulk[:, here_rows], face[:, here_rows], pressure[:, here_rows]
    method = section.drop_method
    flux = spread(mass_flux(section, stream), bulk)
    here = stream.medium.at(bulk, pressure)
    values = layout_values(section, stream.medium, bulk)
    values["reynolds"] = flux * spread(section.bank.root_diameter, bulk) / here.viscosity_pa_s
    values["gas_temperature_k"] = bulk
    values["fin_temperature_k"] = face
    if "viscosity_ratio" in method.options:
        values["viscosity_ratio"] = stream.medium.at(face, pressure).viscosity_pa_s / here.viscosity_pa_s
    loss = evaluate(method, values)
    rows = spread(section.bank.rows, bulk)
    count = rows
    if method.resistances is not None:
        asked = ("arrangement", "transverse_pitch_ratio", "longitudinal_pitch_ratio", "rows")
        count = np.asarray(method.resistances(**{name: values[name] for name in asked}))
    heads = loss * count
    if method.fixed_loss is not None:
        names = (*method.inputs, *(name for name in method.options if name in values))
        heads = heads + method.fixed_loss(**{name: values[name] for name in names})
    friction = heads / rows * flux**2 / (2.0 * here.density_kg_m3)
    return np.broadcast_to(loss, bulk.shape), values["reynolds"], np.broadcast_to(friction, bulk.shape)


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
