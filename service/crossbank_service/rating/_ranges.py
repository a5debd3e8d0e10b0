"""Whether each method of a rating was asked within its published range, from the final states."""

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from crossbank_service.methods.ranges import RangeNotes, in_range
from crossbank_service.methods.record import Method
from crossbank_service.rating import _condensing, _outside, _single_phase
from crossbank_service.rating._arrays import Array, spread
from crossbank_service.rating._condensing import CondensingFilm, CondensingStream
from crossbank_service.rating._lumped import Lump
from crossbank_service.rating._single_phase import SinglePhaseStream
from crossbank_service.rating._solver import Problem, Solution


@dataclass(frozen=True)
class MethodRange:
    """A method of one case: within its range or not, and a sentence that says why not."""

    method: Method
    within: bool
    note: str | None


@dataclass(frozen=True)
class ArrayRange:
    """A method of N cases; sentences are made when asked for."""

    method: Method
    within: NDArray[np.bool_]
    notes: RangeNotes

    def of_case(self, index: int) -> MethodRange:
        """The range of one case."""
        within = bool(self.within[index])
        return MethodRange(self.method, within, None if within else self.notes[index])


def _judge(method: Method, values: dict[str, Array]) -> ArrayRange:
    known = {name: value for name, value in values.items() if name in (*method.inputs, *method.options)}
    within, notes = in_range(method, known)
    return ArrayRange(method, np.asarray(within.reshape(within.shape[0], -1).all(axis=1)), notes)


def ranges(problem: Problem, found: Solution | Lump) -> list[ArrayRange]:
    """Ranges of the methods behind a rating; several a role where the bank has row groups."""
    stream = problem.outside
    if isinstance(found, Solution):
        bulk = 0.5 * (found.field.outside_in + found.field.outside_out)
        face, fin = found.walls.outside_film, found.walls.fin_mean
    else:
        bulk = (0.5 * (stream.inlet_temperature + found.outside_outlet))[:, None]
        face, fin = found.walls.outside_film[:, None], found.walls.fin_mean[:, None]
    pressure = spread(stream.inlet_pressure, bulk)
    out: list[ArrayRange] = []
    for s in problem.sections:
        at = (bulk[:, s.rows], face[:, s.rows], pressure, fin[:, s.rows])
        out.append(_judge(s.heat_method, _outside.film_values(s, stream, *at)))
    for s in problem.sections:
        reynolds = found.drop.reynolds[:, s.rows]
        values = _outside.layout_values(s, stream.medium, reynolds)
        out.append(_judge(s.drop_method, {**values, "reynolds": reynolds}))
    inside = _inside_values(problem, found)
    if inside is not None and isinstance(problem.inside, CondensingStream | SinglePhaseStream):
        out += [_judge(m, inside) for m in (problem.inside.heat_method, problem.inside.drop_method)]
    return out


def _inside_values(problem: Problem, found: Solution | Lump) -> dict[str, Array] | None:
    stream, bank = problem.inside, problem.bank
    if isinstance(stream, SinglePhaseStream):
        flow = _single_phase.row_flow(stream, problem.circuit)
        flux = flow / (bank.tubes_per_row * bank.bore_section)[:, None]
        if isinstance(found, Solution):
            bulk, face, flux = found.field.inside_mean, found.walls.inside_film, flux[:, :, None]
        else:
            bulk = np.repeat(
                (0.5 * (stream.inlet_temperature + found.inside_outlet))[:, None], flux.shape[1], axis=1
            )
            face = np.repeat(found.walls.inside_film[:, None], flux.shape[1], axis=1)
        pressure = spread(stream.inlet_pressure, bulk)
        here, wall = stream.medium.at(bulk, pressure), stream.medium.at(face, pressure)
        return _single_phase.local_values(bank, stream, bulk, face, flux, here, wall)
    if isinstance(stream, CondensingStream):
        if isinstance(found, Solution):
            assert isinstance(found.inside, CondensingFilm)
            film = found.inside
            sat = stream.saturation.at(film.pressure.mean(axis=2))
            difference = film.temperature - found.walls.inside_film
            return _condensing.local_values(
                bank, stream, sat, film.quality, film.flux[:, :, None], difference
            )
        assert found.inside is not None
        flux = found.inside.flow / (bank.rows * bank.tubes_per_row * bank.bore_section)
        sat = stream.saturation.at(stream.inlet_pressure[:, None])
        difference = (found.inside.temperature - found.walls.inside_film)[:, None, None]
        half = np.full_like(difference, 0.5)
        return _condensing.local_values(bank, stream, sat, half, flux[:, None, None], difference)
    return None
