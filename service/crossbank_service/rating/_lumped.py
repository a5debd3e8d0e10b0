"""``resolution: bank``: one set of coefficients and the arrangement's closed relation, as handbook calculations do.

Outside properties at the inlet or at the mean of the terminals, inside properties at the mean of its terminals,
condensing at quality 0.5; P(NTU, C) of the rows and passes is exact for constant coefficients.
"""

from dataclasses import dataclass, fields

import numpy as np

from crossbank_service.methods.effectiveness import effectiveness
from crossbank_service.rating import _condensing, _outside, _single_phase
from crossbank_service.rating._arrays import Array, Cases
from crossbank_service.rating._condensing import CondensingStream
from crossbank_service.rating._outside import OutsideDrop, OutsideFilm
from crossbank_service.rating._single_phase import SinglePhaseStream
from crossbank_service.rating._solver import DUTY_TOLERANCE, LEAST_RISE_K, HeldSurface, Problem
from crossbank_service.rating._wall import Faces, Resistances, faces, in_series

MAX_ITERATIONS = 200


@dataclass(frozen=True)
class InsideLump(Cases):
    """The inside of a lumped rating, (N,); NaN-free, zeros where a member has no meaning."""

    coefficient: Array
    reynolds: Array
    density: Array
    drop: Array
    flow: Array
    capacity: Array
    temperature: Array


@dataclass(frozen=True)
class Lump(Cases):
    """A lumped rating; arrays (N,) unless said otherwise."""

    duty: Array
    ua: Array
    outside_coefficient: Array
    outside_reynolds: Array
    outside_outlet: Array
    outside_density: Array
    drop: OutsideDrop
    inside: InsideLump | None
    inside_outlet: Array
    resistances: Resistances
    walls: Faces
    iterations: Array
    change: Array


def solve(problem: Problem, property_state: str) -> Lump:
    """Rate the cases with one set of coefficients; ``property_state`` is ``inlet`` or ``mean``."""
    lumps = _Lumped(problem, property_state)
    now = lumps.start()
    done = now.blank(problem.cases)
    active = np.arange(problem.cases)
    for count in range(1, MAX_ITERATIONS + 1):
        now = lumps.renew(now, float(count))
        stop = (now.change <= DUTY_TOLERANCE) | (count == MAX_ITERATIONS)
        if count == 1:
            done = now.blank(problem.cases)
            stop &= count == MAX_ITERATIONS
        done.put(active[stop], now.take(np.flatnonzero(stop)))
        keep = np.flatnonzero(~stop)
        if not len(keep):
            break
        if len(keep) < len(active):
            problem, now, active = problem.take(keep), now.take(keep), active[keep]
            lumps = _Lumped(problem, property_state)
    return done


def _column(values: Array) -> Array:
    return values[:, None]


def _cell(values: Array) -> Array:
    return values[:, None, None]


class _Lumped:
    """The renewal of a lumped rating; films are evaluated on (N, 1) arrays."""

    def __init__(self, problem: Problem, property_state: str) -> None:
        self.problem = problem
        self.at_mean = property_state == "mean"
        match problem.inside:
            case HeldSurface() as held:
                self.inside_inlet = held.temperature
            case CondensingStream() as stream:
                self.inside_inlet = stream.saturation.temperature(stream.inlet_pressure)
            case SinglePhaseStream() as stream:
                self.inside_inlet = stream.inlet_temperature

    def start(self) -> Lump:
        inlet, inside = self.problem.outside.inlet_temperature, self.inside_inlet
        walls = Faces.at(0.5 * (inlet + inside))
        # the first heat comes from the outside film alone
        film = self._film(inlet, walls)
        r = self._resistances(film.coefficient[:, 0], walls, None)
        return self._close(r, film.coefficient[:, 0], film.reynolds[:, 0], walls, inlet, None, None, 0.0)

    def renew(self, now: Lump, count: float) -> Lump:
        film = self._film(self._property_temperature(now.outside_outlet), now.walls)
        inside = self._inside(now)
        r = self._resistances(film.coefficient[:, 0], now.walls, inside)
        return self._close(
            r, film.coefficient[:, 0], film.reynolds[:, 0], now.walls, now.outside_outlet, inside, now, count
        )

    def _film(self, bulk: Array, walls: Faces) -> OutsideFilm:
        stream = self.problem.outside
        return _outside.film(
            self.problem.sections[0],
            stream,
            _column(bulk),
            _column(walls.outside_film),
            _column(stream.inlet_pressure),
            _column(walls.fin_mean),
            None,
        )

    def _resistances(self, film: Array, walls: Faces, inside: InsideLump | None) -> Resistances:
        problem = self.problem
        within = None
        if inside is not None and not isinstance(problem.inside, HeldSurface):
            within = _cell(inside.coefficient), _cell(problem.inside.fouling)
        cells = Faces(*(_cell(getattr(walls, f.name)) for f in fields(Faces)))
        one_row = problem.wall.take_rows(0)
        fouling = _cell(problem.outside.fouling)
        found = in_series((problem.sections[0],), one_row, _cell(film), fouling, cells, within)
        return Resistances(
            *(np.broadcast_to(getattr(found, f.name)[:, 0, 0], film.shape) for f in fields(Resistances))
        )

    def _property_temperature(self, outlet: Array) -> Array:
        inlet = self.problem.outside.inlet_temperature
        return 0.5 * (inlet + outlet) if self.at_mean else inlet

    def _close(
        self,
        r: Resistances,
        coefficient: Array,
        reynolds: Array,
        walls: Faces,
        outlet: Array,
        inside: InsideLump | None,
        before: Lump | None,
        count: float,
    ) -> Lump:
        """Close the heat balance for given resistances."""
        problem = self.problem
        stream = problem.outside
        bulk = self._property_temperature(outlet)
        state = stream.medium.at(bulk, stream.inlet_pressure)
        c_outside = stream.mass_flow * state.heat_capacity_j_kg_k
        area = problem.outside_area
        ua = area / r.total
        ntu = ua / c_outside
        if inside is not None and isinstance(problem.inside, SinglePhaseStream):
            p = effectiveness(
                ntu,
                c_outside / inside.capacity,
                rows=problem.circuit.rows,
                passes=problem.circuit.rows_per_pass,
                counter=problem.circuit.against,
            )
            duty = c_outside * p * (self.inside_inlet - stream.inlet_temperature)
            inside_outlet = self.inside_inlet - duty / inside.capacity
            # the mean that carries the duty through the resistances, from the inside's own mean outwards
            inside_mean = 0.5 * (self.inside_inlet + inside_outlet)
        else:
            temperature = self.inside_inlet if inside is None else inside.temperature
            duty = c_outside * -np.expm1(-ntu) * (temperature - stream.inlet_temperature)
            inside_outlet = inside_mean = temperature
        new_outlet = stream.inlet_temperature + duty / c_outside
        walls = faces(r, inside_mean, duty / area)
        scale = np.maximum(np.abs(duty), LEAST_RISE_K * c_outside)
        change = np.full_like(duty, np.inf) if before is None else np.abs(duty - before.duty) / scale
        drop = self._drop(new_outlet, walls)
        if before is not None:
            change = np.maximum(change, np.abs(drop.pressure / before.drop.pressure - 1.0).max(axis=1))
        return Lump(
            duty=duty,
            ua=ua,
            outside_coefficient=coefficient,
            outside_reynolds=reynolds,
            outside_outlet=new_outlet,
            outside_density=state.density_kg_m3,
            drop=drop,
            inside=inside,
            inside_outlet=inside_outlet,
            resistances=r,
            walls=walls,
            iterations=np.full_like(duty, count),
            change=change,
        )

    def _drop(self, outlet: Array, walls: Faces) -> OutsideDrop:
        stream, rows = self.problem.outside, self.problem.circuit.rows
        bulk = np.repeat(_column(self._property_temperature(outlet)), rows, axis=1)
        face = np.repeat(_column(walls.outside_film), rows, axis=1)
        share = np.linspace(0.0, 1.0, rows + 1)[None, :]
        inlet = _column(stream.inlet_temperature)
        ends = inlet + share * (_column(outlet) - inlet)
        # hand calculations take densities at the inlet pressure throughout
        pressure = np.repeat(_column(stream.inlet_pressure), rows + 1, axis=1)
        return _outside.drop(self.problem.sections, stream, bulk, face, ends, pressure)

    def _inside(self, now: Lump) -> InsideLump | None:
        match self.problem.inside:
            case HeldSurface():
                return None
            case SinglePhaseStream() as stream:
                return self._single_phase(stream, now)
            case CondensingStream() as stream:
                return self._condensing(stream, now)

    def _single_phase(self, stream: SinglePhaseStream, now: Lump) -> InsideLump:
        bank, circuit = self.problem.bank, self.problem.circuit
        bulk = 0.5 * (self.inside_inlet + now.inside_outlet)
        total = stream.mass_flow / (bank.tubes_per_row * bank.bore_section)
        middle = (
            stream.inlet_pressure if now.inside is None else stream.inlet_pressure - 0.5 * now.inside.drop
        )
        # passes of unequal rows have coefficients of their own: conductances of parallel rows add up
        weight = np.array(circuit.rows_per_pass, dtype=np.float64)
        flux = total[:, None] / weight
        at = _single_phase.local(
            bank,
            stream,
            np.repeat(_column(bulk), circuit.passes, axis=1),
            np.repeat(_column(now.walls.inside_film), circuit.passes, axis=1),
            flux,
            _column(middle),
        )
        losses = (at.gradient * _column(bank.tube_length)).sum(axis=1)
        heads = flux**2 / (2.0 * at.state.density_kg_m3)
        ends = np.stack([self.inside_inlet, now.inside_outlet], axis=1)
        rho = stream.medium.at(ends, _column(middle)).density_kg_m3
        momentum = flux[:, 0] ** 2 * (1.0 / rho[:, 1] - 1.0 / rho[:, 0])
        return InsideLump(
            coefficient=(at.coefficient * weight).sum(axis=1) / weight.sum(),
            reynolds=(at.reynolds * weight).sum(axis=1) / weight.sum(),
            density=at.state.density_kg_m3[:, 0],
            drop=losses + stream.loss_heads * heads.sum(axis=1) + momentum,
            flow=stream.mass_flow,
            capacity=stream.mass_flow * at.state.heat_capacity_j_kg_k[:, 0],
            temperature=bulk,
        )

    def _condensing(self, stream: CondensingStream, now: Lump) -> InsideLump:
        bank, rows = self.problem.bank, self.problem.circuit.rows
        heat = np.repeat(_column(now.duty / rows), rows, axis=1)[:, :, None]
        face = np.broadcast_to(now.walls.inside_film[:, None, None], heat.shape)
        pressure = np.broadcast_to(stream.inlet_pressure[:, None, None], heat.shape)
        film = _condensing.film(bank, stream, heat, face, pressure)
        nothing = np.zeros_like(now.duty)
        return InsideLump(
            coefficient=film.coefficient[:, 0, 0],
            reynolds=nothing,
            density=stream.inlet_density,
            drop=stream.inlet_pressure - film.outlet_pressure[:, 0],
            flow=film.flow.sum(axis=1),
            capacity=nothing,
            temperature=self.inside_inlet,
        )
