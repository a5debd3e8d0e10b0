"""The row-resolved rating: films, heat balance and pressures of the grid, repeated to a tight tolerance.

Given the films the heat balance is linear and solved exactly; the films and properties are renewed at its
temperatures until nothing moves. Each case is relaxed and stopped by its own history alone, so that a case's result
does not depend on the cases beside it.
"""

from dataclasses import dataclass, replace
from functools import cached_property

import numpy as np

from crossbank_service.banks import TubeBank
from crossbank_service.rating import _condensing, _outside, _single_phase, _wet
from crossbank_service.rating._arrays import Array, Cases, Index, spread
from crossbank_service.rating._circuit import Circuit
from crossbank_service.rating._condensing import CondensingFilm, CondensingStream
from crossbank_service.rating._network import Field, solve_known_inside
from crossbank_service.rating._outside import OutsideDrop, OutsideFilm, OutsideStream
from crossbank_service.rating._section import Section
from crossbank_service.rating._single_phase import SinglePhaseFilm, SinglePhaseStream
from crossbank_service.rating._wall import Faces, Resistances, Wall, faces, in_series
from crossbank_service.rating._wet import Moisture, Wetness

MAX_ITERATIONS = 300
DUTY_TOLERANCE = 1e-9
RESISTANCE_TOLERANCE = 1e-8
FILM_TOLERANCE = 1e-5
PRESSURE_TOLERANCE = 1e-7
LEAST_SECANT_STEP = 1e-8
LEAST_RISE_K = 1e-4
"""Duties are judged against at least this rise of the outside stream: below it temperatures are rounding."""
SLOPES = (-4.0, 0.6)
NO_SLOPES = (0.0, 0.0)


@dataclass(frozen=True)
class HeldSurface(Cases):
    """Outer tube surfaces held at a temperature [K], (N,)."""

    temperature: Array


InsideStream = HeldSurface | CondensingStream | SinglePhaseStream
InsideFilm = CondensingFilm | SinglePhaseFilm | None


@dataclass(frozen=True)
class Problem(Cases):
    """N banks of one shape with their streams: everything a rating needs."""

    sections: tuple[Section, ...]
    outside: OutsideStream
    inside: InsideStream
    circuit: Circuit
    segments: int
    moisture: Moisture | None = None

    @property
    def cases(self) -> int:
        """How many."""
        return len(self.outside.mass_flow)

    @property
    def bank(self) -> TubeBank:
        """The first rows' bank: layout and bore are those of all rows."""
        return self.sections[0].bank

    @cached_property
    def wall(self) -> Wall:
        """The walls of all rows."""
        return Wall.of(self.sections)

    @property
    def outside_area(self) -> Array:
        """All outside surface [m2], (N,)."""
        return np.asarray(self.wall.area[:, :, 0].sum(axis=1))


@dataclass(frozen=True)
class Film(Cases):
    """Logarithm of a film coefficient in every cell, with what its law answered to the value before it.

    The law's answer depends on the coefficient through the surface temperature, mostly through that of the same cell
    (h falls with the difference in a condensing film), so a secant a cell carries the repetition to its end.
    """

    log: Array
    before: Array
    answer: Array

    @classmethod
    def first(cls, log: Array) -> "Film":
        """A film without a history."""
        return cls(log, log, log)

    def renewed(self, answer: Array, relax: Array, slopes: tuple[float, float]) -> "Film":
        """The next value, from what the law answers to this one."""
        step = self.log - self.before
        known = np.abs(step) > LEAST_SECANT_STEP
        slope = np.where(known, (answer - self.answer) / np.where(known, step, 1.0), 0.0)
        slope = np.clip(slope, *slopes)
        return Film(self.log + relax * (answer - self.log) / (1.0 - slope), self.log, answer)

    @property
    def coefficient(self) -> Array:
        """The film coefficient [W/(m2 K)]."""
        return np.exp(self.log)


@dataclass(frozen=True)
class Iterate(Cases):
    """Where the iteration stands; see ``Solution`` for the members."""

    field: Field
    walls: Faces
    outside_film: Film
    inside_film: Film | None
    outside_pressure: Array
    inside_pressure: Array | None
    duty: Array
    resistance_log: Array
    pressure_change: Array
    resistances: Resistances | None
    wetness: Wetness | None


@dataclass(frozen=True)
class Solution(Cases):
    """A converged grid, with everything a report needs."""

    field: Field
    walls: Faces
    resistances: Resistances
    outside: OutsideFilm
    drop: OutsideDrop
    inside: InsideFilm
    wetness: Wetness | None
    iterations: Array
    change: Array


def solve(problem: Problem) -> Solution:
    """Rate the cases of ``problem``; ``change`` above ``DUTY_TOLERANCE`` marks those that did not settle."""
    n = problem.cases
    current = _start(problem)
    done: Iterate | None = None
    iterations = np.zeros(n)
    last_change = np.full(n, np.inf)
    active: Index = np.arange(n)
    part = problem
    relax = np.ones(n)
    previous = np.full(n, np.inf)
    for count in range(1, MAX_ITERATIONS + 1):
        # the pressures move little and cost much: they are renewed at every third step
        new, stirring, duty_change = _step(part, current, relax, renew_pressure=count <= 2 or count % 3 == 0)
        settled = np.maximum(stirring, new.pressure_change / PRESSURE_TOLERANCE) <= 1.0
        iterations[active] = count
        last_change[active] = duty_change
        if done is None:
            done = new.blank(n)
        stop = settled | (count == MAX_ITERATIONS)
        if stop.any():
            done.put(active[stop], new.take(np.flatnonzero(stop)))
        keep = np.flatnonzero(~stop)
        if not len(keep):
            break
        # a case whose change does not fall is taken in smaller steps, one that falls steadily is let go again
        slow = (stirring > 0.8 * previous) & (count > 4)
        relax = np.where(slow, np.maximum(0.6 * relax, 0.05), np.minimum(1.05 * relax, 1.0))
        previous = stirring
        current = new
        if len(keep) < len(active):
            part, current = part.take(keep), new.take(keep)
            relax, previous, active = relax[keep], previous[keep], active[keep]
    assert done is not None
    return _finish(problem, done, iterations, last_change)


def _row_numbers(problem: Problem) -> Array:
    return np.arange(1.0, problem.circuit.rows + 1.0)[None, :, None]


def _start(problem: Problem) -> Iterate:
    n, rows, segments = problem.cases, problem.circuit.rows, problem.segments
    shape = (n, rows, segments)
    cold = np.broadcast_to(problem.outside.inlet_temperature[:, None, None], shape).copy()
    match problem.inside:
        case HeldSurface():
            inside = problem.inside.temperature
            pressure = None
        case CondensingStream():
            inside = problem.inside.saturation.temperature(problem.inside.inlet_pressure)
            pressure = np.broadcast_to(problem.inside.inlet_pressure[:, None, None], shape).copy()
        case SinglePhaseStream():
            inside = problem.inside.inlet_temperature
            pressure = np.repeat(problem.inside.inlet_pressure[:, None], problem.circuit.passes + 1, axis=1)
    warm = np.broadcast_to(inside[:, None, None], shape).copy()
    middle = 0.5 * (cold + warm)
    outside_pressure = np.repeat(problem.outside.inlet_pressure[:, None], rows + 1, axis=1)
    film = _film_by_rows(problem, cold, Faces.at(middle), outside_pressure[:, :-1, None])
    # a first heat from the outside film alone gives the condensing march a flow to start from
    c_outside = _capacity_outside(problem, cold, cold, outside_pressure)
    area = _cell_area(problem, cold)
    field = solve_known_inside(
        0.7 * film.coefficient * area, c_outside, problem.outside.inlet_temperature, warm
    )
    return Iterate(
        field=field,
        walls=Faces.at(middle),
        outside_film=Film.first(np.log(film.coefficient)),
        inside_film=None,
        outside_pressure=outside_pressure,
        inside_pressure=pressure,
        duty=field.heat.sum(axis=(1, 2)),
        resistance_log=np.zeros(shape),
        pressure_change=np.full(n, np.inf),
        resistances=None,
        wetness=None if problem.moisture is None else _wet.dry(problem.moisture, middle),
    )


def _cell_area(problem: Problem, like: Array) -> Array:
    return np.broadcast_to(problem.wall.area / problem.segments, like.shape)


def _capacity_outside(problem: Problem, first: Array, second: Array, pressure: Array) -> Array:
    """Capacity rate of the outside stream through each cell [W/K], secant between the cell's ends."""
    medium, p = problem.outside.medium, pressure[:, :1, None]
    cp = _outside.secant_heat_capacity(medium, first, second, p)
    return cp * spread(problem.outside.mass_flow / problem.segments, first)


def _outside_film(problem: Problem, now: Iterate) -> OutsideFilm:
    bulk = 0.5 * (now.field.outside_in + now.field.outside_out)
    pressure = 0.5 * (now.outside_pressure[:, 1:] + now.outside_pressure[:, :-1])[:, :, None]
    return _film_by_rows(problem, bulk, now.walls, pressure)


def _film_by_rows(problem: Problem, bulk: Array, walls: Faces, pressure: Array) -> OutsideFilm:
    numbers = np.broadcast_to(_row_numbers(problem), (1, problem.circuit.rows, 1))
    parts = [
        _outside.film(
            s,
            problem.outside,
            bulk[:, s.rows],
            walls.outside_film[:, s.rows],
            pressure[:, s.rows],
            walls.fin_mean[:, s.rows],
            numbers[:, s.rows] - s.counted_from,
        )
        for s in problem.sections
    ]
    if len(parts) == 1:
        return parts[0]
    return OutsideFilm(
        *(
            np.concatenate([getattr(part, name) for part in parts], axis=1)
            for name in ("coefficient", "reynolds", "prandtl")
        )
    )


def _outside_drop(problem: Problem, now: Iterate) -> OutsideDrop:
    bulk = 0.5 * (now.field.outside_in + now.field.outside_out).mean(axis=2)
    ends = np.concatenate(
        [now.field.outside_in[:, :1].mean(axis=2), now.field.outside_out.mean(axis=2)], axis=1
    )
    face = now.walls.outside_film.mean(axis=2)
    return _outside.drop(problem.sections, problem.outside, bulk, face, ends, now.outside_pressure)


def _inside_film(problem: Problem, now: Iterate) -> InsideFilm:
    match problem.inside:
        case HeldSurface():
            return None
        case CondensingStream() as stream:
            assert now.inside_pressure is not None
            return _condensing.film(
                problem.bank, stream, now.field.heat, now.walls.inside_film, now.inside_pressure
            )
        case SinglePhaseStream() as stream:
            assert now.inside_pressure is not None
            return _single_phase.film(
                problem.bank, stream, problem.circuit, now.field, now.walls.inside_film, now.inside_pressure
            )


def _resistances(problem: Problem, now: Iterate, outside: Film, inside: Film | None) -> Resistances:
    within = None
    if inside is not None and not isinstance(problem.inside, HeldSurface):
        within = inside.coefficient, spread(problem.inside.fouling, now.field.heat)
    fouling = spread(problem.outside.fouling, now.field.heat)
    return in_series(problem.sections, problem.wall, outside.coefficient, fouling, now.walls, within)


def _wetness(problem: Problem, now: Iterate, dry: Array, capacity: Array) -> Wetness | None:
    """Moisture of the cells at the last heat balance; None where nothing can condense."""
    if problem.moisture is None or now.wetness is None or now.resistances is None:
        return now.wetness
    plain = replace(now.wetness, capacity_factor=np.ones_like(capacity))
    return _wet.renew(
        problem.moisture,
        problem.outside,
        now.field,
        now.walls,
        now.resistances,
        dry,
        problem.wall.prime_share,
        _cell_area(problem, dry),
        _wet.capacity_outside(problem.moisture, plain, now.field, capacity),
        0.5 * (now.outside_pressure[:, 1:] + now.outside_pressure[:, :-1])[:, :, None],
    )


def _balance(problem: Problem, film: InsideFilm, ua: Array, c_outside: Array) -> Field:
    inlet = problem.outside.inlet_temperature
    if isinstance(film, SinglePhaseFilm):
        assert isinstance(problem.inside, SinglePhaseStream)
        return _single_phase.balance(problem.inside, problem.circuit, film, ua, c_outside, inlet)
    if isinstance(film, CondensingFilm):
        return solve_known_inside(ua, c_outside, inlet, film.temperature)
    assert isinstance(problem.inside, HeldSurface)
    surface = np.broadcast_to(problem.inside.temperature[:, None, None], ua.shape)
    return solve_known_inside(ua, c_outside, inlet, surface)


def _step(
    problem: Problem, now: Iterate, relax: Array, *, renew_pressure: bool
) -> tuple[Iterate, Array, Array]:
    """One renewal.

    Returns the new iterate, each case's largest change over its tolerance (but for that of the outside pressure, which
    is not renewed every time), and its duty change.
    """
    like = now.field.heat
    weight = spread(relax, like)
    dry = _outside_film(problem, now).coefficient
    capacity = _capacity_outside(problem, now.field.outside_in, now.field.outside_out, now.outside_pressure)
    wetness = _wetness(problem, now, dry, capacity)
    outside = np.log(dry)
    if wetness is not None:
        assert problem.moisture is not None
        outside = outside + np.log(wetness.film_factor)
        capacity = _wet.capacity_outside(problem.moisture, wetness, now.field, capacity)
    # a wet cell's film and its capacity rate move together: no secant, and as tight as the heat balance
    tolerance, slopes = (FILM_TOLERANCE, SLOPES) if wetness is None else (RESISTANCE_TOLERANCE, NO_SLOPES)
    change = np.abs(outside - now.outside_film.log).max(axis=(1, 2)) / tolerance
    outside_film = now.outside_film.renewed(outside, weight, slopes)

    film = _inside_film(problem, now)
    inside_film = None
    inside_pressure = None
    if film is not None:
        inside = np.log(film.coefficient)
        inside_pressure = film.pressure
        if now.inside_film is not None:
            moved = np.abs(inside - now.inside_film.log).max(axis=(1, 2))
            change = np.maximum(change, moved / FILM_TOLERANCE)
            inside_film = now.inside_film.renewed(inside, weight, slopes)
            assert now.inside_pressure is not None
            step = inside_pressure - now.inside_pressure
            moved = np.abs(step / now.inside_pressure).reshape(len(change), -1).max(axis=1)
            change = np.maximum(change, moved / PRESSURE_TOLERANCE)
            inside_pressure = now.inside_pressure + spread(relax, step) * step
        else:
            inside_film = Film.first(inside)
            change = np.full_like(change, np.inf)

    resistances = _resistances(problem, now, outside_film, inside_film)
    total = np.broadcast_to(resistances.total, like.shape)
    ua = _cell_area(problem, like) / total
    resistance = np.log(total)
    moved = np.abs(resistance - now.resistance_log).max(axis=(1, 2))
    change = np.maximum(change, moved / RESISTANCE_TOLERANCE)
    field = _balance(problem, film, ua, capacity)
    walls = faces(resistances, field.inside_mean, field.heat / _cell_area(problem, like))
    pressure, pressure_change = now.outside_pressure, now.pressure_change
    if renew_pressure:
        pressure = _outside_drop(problem, now).pressure
        pressure_change = np.abs(pressure / now.outside_pressure - 1.0).max(axis=1)
    duty = field.heat.sum(axis=(1, 2))
    scale = np.maximum(np.abs(duty), LEAST_RISE_K * capacity[:, 0].sum(axis=1))
    duty_change = np.abs(duty - now.duty) / scale
    new = Iterate(
        field,
        walls,
        outside_film,
        inside_film,
        pressure,
        inside_pressure,
        duty,
        resistance,
        pressure_change,
        resistances,
        wetness,
    )
    return new, np.maximum(change, duty_change / DUTY_TOLERANCE), duty_change


def _finish(problem: Problem, done: Iterate, iterations: Array, change: Array) -> Solution:
    film = _outside_film(problem, done)
    inside = _inside_film(problem, done)
    return Solution(
        field=done.field,
        walls=done.walls,
        resistances=_resistances(problem, done, done.outside_film, done.inside_film),
        outside=film,
        drop=_outside_drop(problem, done),
        inside=inside,
        wetness=done.wetness,
        iterations=iterations,
        change=change,
    )
