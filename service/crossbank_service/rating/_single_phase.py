"""A single-phase stream inside the tubes: film, pressure along the passes, capacity rates."""

from dataclasses import dataclass

import numpy as np

from crossbank_service.banks import TubeBank
from crossbank_service.methods.record import Method
from crossbank_service.properties import Medium, State
from crossbank_service.rating._arrays import Array, Cases, spread
from crossbank_service.rating._circuit import Circuit
from crossbank_service.rating._network import Field, solve_passes
from crossbank_service.rating._outside import evaluate, secant_heat_capacity, temperature_of


@dataclass(frozen=True)
class SinglePhaseStream(Cases):
    """The inside stream of N cases; arrays (N,), SI.

    Attributes
    ----------
    medium : Medium
    mass_flow, inlet_temperature, inlet_pressure, fouling : Array
        [kg/s], [K], [Pa], [m2 K/W on the bore]
    loss_heads : Array
        Velocity heads lost in entry, exit and headers of each pass.
    heat_method, drop_method : Method
    """

    medium: Medium
    mass_flow: Array
    inlet_temperature: Array
    inlet_pressure: Array
    fouling: Array
    loss_heads: Array
    heat_method: Method
    drop_method: Method


@dataclass(frozen=True)
class SinglePhaseFilm(Cases):
    """Film and flow in every cell, (N, rows, segments) unless said otherwise.

    ``capacity`` is that of the whole row [W/K], ``mixing`` (N, passes) [K], ``row_drop`` (N, rows) [Pa] with the
    losses of its pass, ``pressure`` (N, passes + 1) from the inlet header to the outlet header, ``mean_pressure``
    (N,) of both, at which enthalpies are taken.
    """

    coefficient: Array
    reynolds: Array
    prandtl: Array
    density: Array
    capacity: Array
    mixing: Array
    row_drop: Array
    pressure: Array
    flux: Array
    mean_pressure: Array


@dataclass(frozen=True)
class Local:
    """Film coefficient, Reynolds number and friction gradient [Pa/m] at given temperatures."""

    state: State
    coefficient: Array
    reynolds: Array
    gradient: Array


def local_values(
    bank: TubeBank, stream: SinglePhaseStream, bulk: Array, face: Array, flux: Array, here: State, wall: State
) -> dict[str, Array]:
    """Everything an inside method may ask for; arrays (N, ...), ``flux`` per tube [kg/(m2 s)]."""
    bore = spread(bank.bore, bulk)
    return {
        "reynolds": flux * bore / here.viscosity_pa_s,
        "prandtl": here.prandtl,
        "diameter_length_ratio": bore / spread(bank.tube_length, bulk),
        "relative_roughness": spread(bank.roughness, bulk) / bore,
        "gas": np.full((bulk.shape[0],) + (1,) * (bulk.ndim - 1), float(stream.medium.gas)),
        "temperature_ratio": bulk / face,
        "prandtl_wall": wall.prandtl,
        "viscosity_ratio": wall.viscosity_pa_s / here.viscosity_pa_s,
    }


def local(
    bank: TubeBank, stream: SinglePhaseStream, bulk: Array, face: Array, flux: Array, pressure: Array
) -> Local:
    """Evaluate the inside methods at bulk and surface temperatures; arrays (N, ...)."""
    here = stream.medium.at(bulk, pressure)
    values = local_values(bank, stream, bulk, face, flux, here, stream.medium.at(face, pressure))
    bore = spread(bank.bore, bulk)
    nusselt = evaluate(stream.heat_method, values)
    friction = evaluate(stream.drop_method, values)
    return Local(
        state=here,
        coefficient=nusselt * here.conductivity_w_m_k / bore,
        reynolds=values["reynolds"],
        gradient=friction / bore * flux**2 / (2.0 * here.density_kg_m3),
    )


def row_flow(stream: SinglePhaseStream, circuit: Circuit) -> Array:
    """Mass flow of each row (N, rows) [kg/s]: the rows of a pass share it evenly."""
    share = np.array([1.0 / circuit.rows_per_pass[p] for p in circuit.pass_of_row])
    return np.asarray(stream.mass_flow[:, None] * share)


def film(
    bank: TubeBank,
    stream: SinglePhaseStream,
    circuit: Circuit,
    field: Field,
    face: Array,
    pressure: Array,
) -> SinglePhaseFilm:
    """Film coefficients, capacity rates and pressure drops at the temperatures of ``field``.

    Parameters
    ----------
    face : Array (N, rows, segments)
        Temperature of the surface the stream touches [K].
    pressure : Array (N, passes + 1)
        Last known header pressures [Pa].
    """
    t = field.inside_mean
    of_pass = np.array(circuit.pass_of_row)
    middle = 0.5 * (pressure[:, of_pass] + pressure[:, of_pass + 1])[:, :, None]
    flow = row_flow(stream, circuit)
    flux = (flow / (bank.tubes_per_row * bank.bore_section)[:, None])[:, :, None]
    at = local(bank, stream, t, face, flux, middle)
    # enthalpies at one pressure throughout: what a stream loses in pressure stays in it as enthalpy
    mean = 0.5 * (pressure[:, 0] + pressure[:, -1])
    capacity = secant_heat_capacity(stream.medium, field.inside_in, field.inside_out, mean[:, None, None])
    along = (at.gradient * spread(bank.tube_length, t) / t.shape[2]).sum(axis=2)
    first, last = row_ends(field, circuit)
    row_pressure = pressure[:, of_pass], pressure[:, of_pass + 1]
    rho_in = stream.medium.at(first, row_pressure[0]).density_kg_m3
    rho_out = stream.medium.at(last, row_pressure[1]).density_kg_m3
    heads = flux[:, :, 0] ** 2 / (2.0 * rho_in)
    momentum = flux[:, :, 0] ** 2 * (1.0 / rho_out - 1.0 / rho_in)
    row_drop = along + momentum + stream.loss_heads[:, None] * heads

    mixing = np.zeros((t.shape[0], circuit.passes))
    headers = [stream.inlet_pressure]
    for p, members in enumerate(circuit.rows_of_pass):
        index = np.array(members)
        headers.append(headers[-1] - row_drop[:, index].mean(axis=1))
        mixing[:, p] = _mixing(stream.medium, last[:, index], mean)
    floor = 0.1 * stream.inlet_pressure[:, None]
    return SinglePhaseFilm(
        coefficient=at.coefficient,
        reynolds=at.reynolds,
        prandtl=at.state.prandtl,
        density=at.state.density_kg_m3,
        capacity=capacity * flow[:, :, None],
        mixing=mixing,
        row_drop=row_drop,
        pressure=np.maximum(np.stack(headers, axis=1), floor),
        flux=flux[:, :, 0],
        mean_pressure=mean,
    )


def row_ends(field: Field, circuit: Circuit) -> tuple[Array, Array]:
    """Temperatures entering and leaving each row along the inside stream, (N, rows) each."""
    backwards = [circuit.backwards(p) for p in circuit.pass_of_row]
    first = np.stack([field.inside_in[:, r, -1 if b else 0] for r, b in enumerate(backwards)], axis=1)
    last = np.stack([field.inside_out[:, r, 0 if b else -1] for r, b in enumerate(backwards)], axis=1)
    return first, last


def _mixing(medium: Medium, leaving: Array, pressure: Array) -> Array:
    """What mixing by enthalpy adds to the plain mean of the leaving temperatures [K], (N,)."""
    plain = leaving.mean(axis=1)
    if leaving.shape[1] == 1:
        return np.zeros_like(plain)
    enthalpy = medium.enthalpy(leaving, pressure[:, None]).mean(axis=1)
    return np.asarray(temperature_of(medium, enthalpy, plain, pressure) - plain)


def balance(
    stream: SinglePhaseStream,
    circuit: Circuit,
    film_now: SinglePhaseFilm,
    ua: Array,
    c_outside: Array,
    outside_inlet: Array,
) -> Field:
    """Solve the grid for this stream."""
    return solve_passes(
        ua, c_outside, film_now.capacity, outside_inlet, stream.inlet_temperature, film_now.mixing, circuit
    )


def outlet_temperature(
    stream: SinglePhaseStream, circuit: Circuit, field: Field, mean_pressure: Array
) -> Array:
    """Mixed outlet temperature of the last pass [K], (N,)."""
    index = np.array(circuit.rows_of_pass[-1])
    last = row_ends(field, circuit)[1][:, index]
    return np.asarray(last.mean(axis=1) + _mixing(stream.medium, last, mean_pressure))
