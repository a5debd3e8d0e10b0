"""What a rating found, case by case: one set of arrays whether the bank was resolved by rows or lumped."""

from dataclasses import dataclass, fields

import numpy as np

from crossbank_service.properties import psychrometrics
from crossbank_service.rating import _single_phase
from crossbank_service.rating._arrays import Array, Cases
from crossbank_service.rating._buoyancy import richardson
from crossbank_service.rating._condensing import CondensingFilm, CondensingStream
from crossbank_service.rating._lumped import Lump
from crossbank_service.rating._outside import mass_flux, temperature_of
from crossbank_service.rating._single_phase import SinglePhaseFilm, SinglePhaseStream
from crossbank_service.rating._solver import LEAST_RISE_K, HeldSurface, Problem, Solution
from crossbank_service.rating._wall import Faces, Resistances

SHARES = ("outside", "outside_fouling", "fin_bond", "wall", "inside_fouling", "inside")


@dataclass(frozen=True)
class OutsideFound(Cases):
    """The outside stream; (N,), SI."""

    outlet_temperature: Array
    inlet_density: Array
    outlet_density: Array
    outlet_pressure: Array
    friction_drop: Array
    momentum_drop: Array
    approach_velocity: Array
    max_velocity: Array
    reynolds: Array
    coefficient: Array
    fin_efficiency: Array
    surface_efficiency: Array
    bulk_min: Array
    bulk_max: Array
    face_min: Array
    face_max: Array
    richardson: Array
    choked: Array


@dataclass(frozen=True)
class InsideFound(Cases):
    """The inside stream; (N,), SI; zeros where a member has no meaning."""

    flow: Array
    inlet_temperature: Array
    outlet_temperature: Array
    outlet_pressure: Array
    drop: Array
    coefficient: Array
    inlet_velocity: Array
    outlet_velocity: Array
    flux: Array
    reynolds: Array
    density: Array
    bulk_min: Array
    bulk_max: Array
    face_min: Array
    face_max: Array
    choked: Array


@dataclass(frozen=True)
class OverallFound(Cases):
    """The exchanger as a whole; (N,), SI; NaN marks what does not exist for a case and never leaves the house."""

    ua: Array
    coefficient: Array
    coefficient_clean: Array
    log_mean: Array
    mean_difference: Array
    correction: Array
    effectiveness: Array
    ntu: Array
    closest_approach: Array
    shares: Array


@dataclass(frozen=True)
class RowsFound(Cases):
    """Row by row, (N, rows)."""

    heat: Array
    outside_inlet: Array
    outside_outlet: Array
    inside: Array
    wall: Array
    reynolds: Array
    outside_coefficient: Array
    inside_coefficient: Array
    drop: Array
    condensate: Array


@dataclass(frozen=True)
class WallFound(Cases):
    """Extremes of the metal; ``*_row`` counts from 1, ``*_inner`` is 1.0 for the inner surface."""

    lowest: Array
    highest: Array
    lowest_row: Array
    highest_row: Array
    lowest_inner: Array
    highest_inner: Array
    fin_tip_highest: Array


@dataclass(frozen=True)
class WetFound(Cases):
    """Moisture of a bank, (N,) and by rows (N, rows); [W], [kg/s], humidity ratio of the outlet."""

    latent: Array
    removed: Array
    fog: Array
    outlet_humidity: Array
    row_wet: Array
    row_condensate: Array
    frost: Array


@dataclass(frozen=True)
class Performance(Cases):
    """Everything a result is made of."""

    duty: Array
    wet: WetFound | None
    outside: OutsideFound
    inside: InsideFound | None
    overall: OverallFound
    wall: WallFound
    rows: RowsFound | None
    residual: Array
    iterations: Array
    change: Array


def _weighted(values: Array, heat: Array) -> Array:
    """Mean coefficient that reproduces the heat: sum(q)/sum(q/h) over equal areas."""
    flat, weight = values.reshape(len(values), -1), np.abs(heat).reshape(len(heat), -1)
    weight = np.where(weight.sum(axis=1, keepdims=True) > 0.0, weight, 1.0)
    return np.asarray(weight.sum(axis=1) / (weight / flat).sum(axis=1))


def _row_weighted(values: Array, heat: Array) -> Array:
    weight = np.abs(heat)
    weight = np.where(weight.sum(axis=2, keepdims=True) > 0.0, weight, 1.0)
    return np.asarray(weight.sum(axis=2) / (weight / values).sum(axis=2))


def _low(values: Array) -> Array:
    return np.asarray(values.reshape(len(values), -1).min(axis=1))


def _high(values: Array) -> Array:
    return np.asarray(values.reshape(len(values), -1).max(axis=1))


def of_solution(problem: Problem, found: Solution) -> Performance:
    """Performance of a row-resolved rating."""
    field, stream = found.field, problem.outside
    heat = field.heat
    leaving = field.outside_out[:, -1]
    p_in = stream.inlet_pressure
    enthalpy = stream.medium.enthalpy(leaving, p_in[:, None]).mean(axis=1)
    outlet = temperature_of(stream.medium, enthalpy, leaving.mean(axis=1), p_in)
    duty = stream.mass_flow * (enthalpy - stream.medium.enthalpy(stream.inlet_temperature, p_in))
    wet = _wet_found(problem, found)
    if wet is not None:
        duty = duty - _vapour_lost(problem, found)
    outside = _outside(
        problem,
        outlet=outlet,
        pressure=found.drop.pressure[:, -1],
        friction=found.drop.friction.sum(axis=1),
        momentum=found.drop.momentum.sum(axis=1),
        density=found.drop.density.min(axis=1),
        reynolds=found.outside.reynolds.mean(axis=2).mean(axis=1),
        coefficient=_weighted(found.outside.coefficient, heat),
        bulk=np.stack(
            [
                _low(np.minimum(field.outside_in, field.outside_out)),
                _high(np.maximum(field.outside_in, field.outside_out)),
            ]
        ),
        faces=found.walls,
        resistances=found.resistances,
        buoyancy=richardson(
            problem,
            0.5 * (field.outside_in + field.outside_out).mean(axis=2),
            found.walls.outside_film.mean(axis=2),
        ),
    )
    inside = _inside_of_solution(problem, found)
    given_off = heat.sum(axis=(1, 2))
    if isinstance(problem.inside, SinglePhaseStream) and isinstance(found.inside, SinglePhaseFilm):
        assert inside is not None
        medium, s = problem.inside.medium, problem.inside
        at = found.inside.mean_pressure
        h_in = medium.enthalpy(s.inlet_temperature, at)
        given_off = s.mass_flow * (h_in - medium.enthalpy(inside.outlet_temperature, at))
    scale = np.maximum(
        np.abs(duty), LEAST_RISE_K * stream.mass_flow * stream.medium.at(outlet, p_in).heat_capacity_j_kg_k
    )
    rows = RowsFound(
        heat=heat.sum(axis=2),
        outside_inlet=field.outside_in.mean(axis=2),
        outside_outlet=field.outside_out.mean(axis=2),
        inside=field.inside_mean.mean(axis=2),
        wall=found.walls.outer_metal.mean(axis=2),
        reynolds=found.outside.reynolds.mean(axis=2),
        outside_coefficient=_row_weighted(found.outside.coefficient, heat),
        inside_coefficient=np.zeros(heat.shape[:2])
        if found.inside is None
        else _row_weighted(found.inside.coefficient, heat),
        drop=found.drop.friction + found.drop.momentum,
        condensate=found.inside.flow
        if isinstance(found.inside, CondensingFilm)
        else np.zeros(heat.shape[:2]),
    )
    corners = [
        np.abs(field.inside_in - field.outside_out),
        np.abs(field.inside_out - field.outside_out),
        np.abs(field.inside_out - field.outside_in),
        np.abs(field.inside_in - field.outside_in),
    ]
    ua = _conductance(problem, found.resistances, heat).sum(axis=(1, 2))
    return Performance(
        duty=duty,
        wet=wet,
        outside=outside,
        inside=inside,
        overall=_overall(
            problem, duty, ua, found.resistances, heat, outside, inside, _low(np.minimum.reduce(corners)), wet
        ),
        wall=_walls(found.walls, _tips(problem, found.resistances, found.walls)),
        rows=rows,
        residual=np.abs(duty - given_off) / scale,
        iterations=found.iterations,
        change=found.change,
    )


def of_lump(problem: Problem, found: Lump) -> Performance:
    """Performance of a lumped rating."""
    stream = problem.outside
    drop = found.drop
    ends = np.stack([stream.inlet_temperature, found.outside_outlet])
    outside = _outside(
        problem,
        outlet=found.outside_outlet,
        pressure=drop.pressure[:, -1],
        friction=drop.friction.sum(axis=1),
        momentum=drop.momentum.sum(axis=1),
        density=found.outside_density,
        reynolds=found.outside_reynolds,
        coefficient=found.outside_coefficient,
        bulk=np.stack([ends.min(axis=0), ends.max(axis=0)]),
        faces=Faces(*(getattr(found.walls, f.name)[:, None] for f in fields(Faces))),
        resistances=Resistances(*(getattr(found.resistances, f.name)[:, None] for f in fields(Resistances))),
        buoyancy=richardson(problem, ends.mean(axis=0)[:, None], found.walls.outside_film[:, None]),
    )
    inside = _inside_of_lump(problem, found)
    heat = found.duty[:, None]
    inlet = _inside_inlet(problem)
    outlet = found.inside_outlet
    terminals = np.abs(np.stack([inlet - found.outside_outlet, outlet - stream.inlet_temperature]))
    lumped = Resistances(
        *(
            np.broadcast_to(getattr(found.resistances, f.name), found.duty.shape)[:, None]
            for f in fields(Resistances)
        )
    )
    cells = Faces(*(getattr(found.walls, f.name)[:, None, None] for f in fields(Faces)))
    spread_r = Resistances(*(getattr(lumped, f.name)[:, :, None] for f in fields(Resistances)))
    return Performance(
        duty=found.duty,
        wet=None,
        outside=outside,
        inside=inside,
        overall=_overall(
            problem, found.duty, found.ua, lumped, heat, outside, inside, terminals.min(axis=0), None
        ),
        wall=_walls(cells, _tips(problem, spread_r, cells)),
        rows=None,
        residual=np.zeros_like(found.duty),
        iterations=found.iterations,
        change=found.change,
    )


def _wet_found(problem: Problem, found: Solution) -> WetFound | None:
    w, moisture = found.wetness, problem.moisture
    if w is None or moisture is None:
        return None
    condensed = w.condensed.sum(axis=2)
    return WetFound(
        latent=w.latent.sum(axis=(1, 2)),
        removed=condensed.sum(axis=1),
        fog=w.fog.sum(axis=(1, 2)),
        outlet_humidity=w.leaving[:, -1].mean(axis=1),
        row_wet=(condensed > 0.0).astype(np.float64),
        row_condensate=condensed,
        frost=_high(w.frost),
    )


def _vapour_lost(problem: Problem, found: Solution) -> Array:
    """Enthalpy that vapour takes out of the stream, less that of its condensate and fog [W].

    The stream is followed to its outlet with all the vapour of the inlet; what it has lost by then is taken out at the
    outlet temperature, condensate at the temperature of its surface, fog at that of the cell it formed in.
    """
    w, moisture, field = found.wetness, problem.moisture, found.field
    assert w is not None
    assert moisture is not None
    dry = moisture.dry_flow / field.outside_in.shape[2]
    last = field.outside_out[:, -1]
    lost = dry[:, None] * (moisture.humidity[:, None] - w.leaving[:, -1])
    vapour = (lost * psychrometrics.vapour_enthalpy(last)).sum(axis=1)
    liquid = w.condensed * psychrometrics.condensate_enthalpy(w.surface)
    mist = w.fog * psychrometrics.condensate_enthalpy(w.surface)
    return np.asarray(vapour - liquid.sum(axis=(1, 2)) - mist.sum(axis=(1, 2)))


def _outside(
    problem: Problem,
    *,
    outlet: Array,
    pressure: Array,
    friction: Array,
    momentum: Array,
    density: Array,
    reynolds: Array,
    coefficient: Array,
    bulk: Array,
    faces: Faces,
    resistances: Resistances,
    buoyancy: Array,
) -> OutsideFound:
    stream = problem.outside
    inlet_density = stream.medium.at(stream.inlet_temperature, stream.inlet_pressure).density_kg_m3
    return OutsideFound(
        outlet_temperature=outlet,
        inlet_density=inlet_density,
        outlet_density=stream.medium.at(outlet, pressure).density_kg_m3,
        outlet_pressure=pressure,
        friction_drop=friction,
        momentum_drop=momentum,
        approach_velocity=stream.mass_flow / (inlet_density * problem.bank.face_area),
        max_velocity=np.max([mass_flux(s, stream) for s in problem.sections], axis=0) / density,
        reynolds=reynolds,
        coefficient=coefficient,
        bulk_min=bulk[0],
        bulk_max=bulk[1],
        fin_efficiency=_finned_mean(problem, resistances.fin_efficiency),
        surface_efficiency=resistances.surface_efficiency.reshape(len(outlet), -1).mean(axis=1),
        face_min=np.minimum(_low(faces.outside_film), _low(faces.fin_root)),
        face_max=np.maximum(_high(faces.outside_film), _high(faces.fin_root)),
        richardson=buoyancy,
        choked=(friction + momentum > 0.5 * stream.inlet_pressure).astype(np.float64),
    )


def _inside_of_solution(problem: Problem, found: Solution) -> InsideFound | None:
    field, film = found.field, found.inside
    if isinstance(film, SinglePhaseFilm):
        assert isinstance(problem.inside, SinglePhaseStream)
        return single_phase_found(problem, problem.inside, film, field.heat, found)
    if isinstance(film, CondensingFilm):
        assert isinstance(problem.inside, CondensingStream)
        stream = problem.inside
        outlet = film.outlet_pressure.min(axis=1)
        flow = film.flow.sum(axis=1)
        share = film.flow / np.maximum(flow, 1e-300)[:, None]
        at_outlet = stream.saturation.temperature(film.outlet_pressure)
        flux = film.flux.max(axis=1)
        return InsideFound(
            flow=flow,
            inlet_temperature=stream.saturation.temperature(stream.inlet_pressure) + stream.superheat,
            outlet_temperature=(at_outlet * share).sum(axis=1),
            outlet_pressure=outlet,
            drop=stream.inlet_pressure - outlet,
            coefficient=_weighted(film.coefficient, field.heat),
            inlet_velocity=flux / stream.inlet_density,
            outlet_velocity=flux / film.liquid_density.mean(axis=1),
            flux=flux,
            reynolds=(film.flux * problem.bank.bore[:, None] / film.vapour_viscosity).max(axis=1),
            density=stream.inlet_density,
            bulk_min=_low(film.temperature),
            bulk_max=_high(film.temperature),
            face_min=_low(found.walls.inside_film),
            face_max=_high(found.walls.inside_film),
            choked=(outlet < 0.5 * stream.inlet_pressure).astype(np.float64),
        )
    return None


def single_phase_found(
    problem: Problem, stream: SinglePhaseStream, film: SinglePhaseFilm, heat: Array, found: Solution
) -> InsideFound:
    """The inside stream of a row-resolved single-phase rating."""
    field = found.field
    outlet = _single_phase.outlet_temperature(stream, problem.circuit, field, film.mean_pressure)
    ends = np.stack([stream.inlet_temperature, outlet], axis=1)
    p_ends = np.stack([stream.inlet_pressure, film.pressure[:, -1]], axis=1)
    density = stream.medium.at(ends, p_ends).density_kg_m3
    drop = stream.inlet_pressure - film.pressure[:, -1]
    first, last = problem.circuit.rows_of_pass[0][0], problem.circuit.rows_of_pass[-1][0]
    return InsideFound(
        flow=stream.mass_flow,
        inlet_temperature=stream.inlet_temperature,
        outlet_temperature=outlet,
        outlet_pressure=film.pressure[:, -1],
        drop=drop,
        coefficient=_weighted(film.coefficient, heat),
        inlet_velocity=film.flux[:, first] / density[:, 0],
        outlet_velocity=film.flux[:, last] / density[:, 1],
        flux=film.flux.max(axis=1),
        reynolds=film.reynolds.mean(axis=2).mean(axis=1),
        density=film.density.mean(axis=2).mean(axis=1),
        bulk_min=_low(np.minimum(field.inside_in, field.inside_out)),
        bulk_max=_high(np.maximum(field.inside_in, field.inside_out)),
        face_min=_low(found.walls.inside_film),
        face_max=_high(found.walls.inside_film),
        choked=(drop > 0.5 * stream.inlet_pressure).astype(np.float64),
    )


def _inside_inlet(problem: Problem) -> Array:
    match problem.inside:
        case HeldSurface() as held:
            return held.temperature
        case CondensingStream() as stream:
            return stream.saturation.temperature(stream.inlet_pressure)
        case SinglePhaseStream() as stream:
            return stream.inlet_temperature


def _inside_of_lump(problem: Problem, found: Lump) -> InsideFound | None:
    lump = found.inside
    if lump is None or isinstance(problem.inside, HeldSurface):
        return None
    stream, bank = problem.inside, problem.bank
    inlet = _inside_inlet(problem)
    outlet_pressure = stream.inlet_pressure - lump.drop
    parallel = (
        problem.circuit.rows if isinstance(stream, CondensingStream) else problem.circuit.rows_per_pass[0]
    )
    flux = lump.flow / (parallel * bank.tubes_per_row * bank.bore_section)
    if isinstance(stream, CondensingStream):
        # the mean of the terminals has no meaning for vapour that condenses; both ends are at saturation
        at_outlet = stream.saturation.temperature(np.maximum(outlet_pressure, 0.1 * stream.inlet_pressure))
        sat = stream.saturation.at(stream.inlet_pressure)
        densities = stream.inlet_density, sat.liquid_density_kg_m3
        reynolds = flux * bank.bore / sat.vapour_viscosity_pa_s
        inlet_temperature = inlet + stream.superheat
    else:
        at_outlet = found.inside_outlet
        medium = stream.medium
        densities = (
            medium.at(inlet, stream.inlet_pressure).density_kg_m3,
            medium.at(at_outlet, stream.inlet_pressure).density_kg_m3,
        )
        reynolds = lump.reynolds
        inlet_temperature = inlet
    ends = np.stack([inlet, at_outlet])
    face = found.walls.inside_film
    return InsideFound(
        flow=lump.flow,
        inlet_temperature=inlet_temperature,
        outlet_temperature=at_outlet,
        outlet_pressure=outlet_pressure,
        drop=lump.drop,
        coefficient=lump.coefficient,
        inlet_velocity=flux / densities[0],
        outlet_velocity=flux / densities[1],
        flux=flux,
        reynolds=reynolds,
        density=lump.density,
        bulk_min=ends.min(axis=0),
        bulk_max=ends.max(axis=0),
        face_min=face,
        face_max=face,
        choked=(lump.drop > 0.5 * stream.inlet_pressure).astype(np.float64),
    )


def _conductance(problem: Problem, r: Resistances, like: Array) -> Array:
    return np.broadcast_to(_cell_area(problem, like) / r.total, like.shape)


def _overall(
    problem: Problem,
    duty: Array,
    ua: Array,
    r: Resistances,
    heat: Array,
    outside: OutsideFound,
    inside: InsideFound | None,
    closest: Array,
    wet: WetFound | None,
) -> OverallFound:
    stream, area = problem.outside, problem.outside_area
    inlet = _inside_inlet(problem)
    inside_out = (
        inside.outlet_temperature if isinstance(problem.inside, SinglePhaseStream) and inside else inlet
    )
    hot_end = inlet - outside.outlet_temperature
    cold_end = inside_out - stream.inlet_temperature
    log_mean = _log_mean(hot_end, cold_end)
    mean = np.abs(duty) / ua
    clean = np.broadcast_to(_cell_area(problem, heat) / r.clean, heat.shape)
    p_in = stream.inlet_pressure
    medium = stream.medium
    greatest = stream.mass_flow * np.abs(
        medium.enthalpy(inlet, p_in) - medium.enthalpy(stream.inlet_temperature, p_in)
    )
    c_min = _capacity(
        duty,
        outside.outlet_temperature - stream.inlet_temperature,
        stream.mass_flow,
        medium.at(stream.inlet_temperature, p_in).heat_capacity_j_kg_k,
    )
    if isinstance(problem.inside, SinglePhaseStream):
        s = problem.inside
        inner = s.mass_flow * np.abs(
            s.medium.enthalpy(s.inlet_temperature, s.inlet_pressure)
            - s.medium.enthalpy(stream.inlet_temperature, s.inlet_pressure)
        )
        greatest = np.minimum(greatest, inner)
        c_inside = _capacity(
            duty,
            s.inlet_temperature - inside_out,
            s.mass_flow,
            s.medium.at(s.inlet_temperature, s.inlet_pressure).heat_capacity_j_kg_k,
        )
        c_min = np.minimum(c_min, c_inside)
    exists = greatest > 0.0
    effectiveness = np.where(exists, np.abs(duty) / np.where(exists, greatest, 1.0), np.nan)
    ntu = ua / c_min
    if wet is not None:  # both are defined for a dry stream
        effectiveness = np.where(wet.removed > 0.0, np.nan, effectiveness)
        ntu = np.where(wet.removed > 0.0, np.nan, ntu)
    weight = np.abs(heat)
    weight = np.where(
        weight.reshape(len(duty), -1).sum(axis=1).reshape(-1, *[1] * (heat.ndim - 1)) > 0.0, weight, 1.0
    )
    parts = np.stack(
        [
            (np.broadcast_to(getattr(r, name), heat.shape) * weight).reshape(len(duty), -1).sum(axis=1)
            for name in SHARES
        ],
        axis=1,
    )
    return OverallFound(
        ua=ua,
        coefficient=ua / area,
        coefficient_clean=clean.reshape(len(duty), -1).sum(axis=1) / area,
        log_mean=log_mean,
        mean_difference=mean,
        correction=mean / log_mean,
        effectiveness=effectiveness,
        ntu=ntu,
        closest_approach=closest,
        shares=parts / parts.sum(axis=1, keepdims=True),
    )


def _capacity(duty: Array, rise: Array, flow: Array, heat_capacity: Array) -> Array:
    """Mean capacity rate of a stream over its way through the bank [W/K]."""
    small = np.abs(rise) < 1e-6
    return np.where(small, flow * heat_capacity, np.abs(duty / np.where(small, 1.0, rise)))


def _log_mean(first: Array, second: Array) -> Array:
    """Logarithmic mean of the magnitudes of two differences [K]; NaN where the terminals cross."""
    cross = first * second <= 0.0
    a = np.where(cross, 1.0, np.abs(first))
    b = np.where(cross, 1.0, np.abs(second))
    ratio = np.log(a / b)
    near = np.abs(ratio) < 1e-6
    mean = np.where(near, 0.5 * (a + b), (a - b) / np.where(near, 1.0, ratio))
    return np.where(cross, np.nan, mean)


def _cell_area(problem: Problem, like: Array) -> Array:
    if like.ndim == 2:  # a lumped bank is one cell
        return problem.outside_area[:, None]
    return np.asarray(problem.wall.area / like.shape[2])


def _finned_mean(problem: Problem, efficiency: Array) -> Array:
    """Mean fin efficiency over the finned rows; 1 where there are none."""
    n = efficiency.shape[0]
    if efficiency.shape[1] < problem.circuit.rows:
        return np.asarray(efficiency.reshape(n, -1).mean(axis=1))
    finned = [s for s in problem.sections if s.bank.fins is not None] or list(problem.sections)
    values = [efficiency[:, s.rows].reshape(n, -1) for s in finned]
    return np.asarray(np.concatenate(values, axis=1).mean(axis=1))


def _tips(problem: Problem, r: Resistances, walls: Faces) -> Array:
    """Highest temperature of the fin tips [K], (N,); that of the roots where they are hotter."""
    highest = []
    for s in problem.sections:
        if s.bank.fins is None:
            continue
        film = 1.0 / (r.film + r.outside_fouling * r.surface_efficiency)[:, s.rows]
        film = np.broadcast_to(film, walls.fin_root[:, s.rows].shape)
        fin, root = walls.fin_mean[:, s.rows], walls.fin_root[:, s.rows]
        efficiency = np.broadcast_to(r.fin_efficiency, walls.fin_root.shape)[:, s.rows]
        # the mean of the fins lies between stream and root by the efficiency
        below = 1.0 - efficiency
        stream = np.where(below > 1e-9, (fin - efficiency * root) / np.where(below > 1e-9, below, 1.0), root)
        highest.append(_high(stream + s.tip_ratio(film, fin) * (root - stream)))
    return np.max(highest, axis=0) if highest else np.zeros(walls.fin_root.shape[0])


def _walls(walls: Faces, tips: Array) -> WallFound:
    n, rows = walls.outer_metal.shape[:2]
    lowest, highest = [], []
    for surface in (walls.outer_metal, walls.inner_metal):
        shaped = surface.reshape(n, rows, -1)
        lowest.append(shaped.min(axis=2))
        highest.append(shaped.max(axis=2))
    low, high = np.concatenate(lowest, axis=1), np.concatenate(highest, axis=1)
    at_low, at_high = low.argmin(axis=1), high.argmax(axis=1)
    case = np.arange(n)
    return WallFound(
        lowest=low[case, at_low],
        highest=high[case, at_high],
        lowest_row=(at_low % rows + 1).astype(np.float64),
        highest_row=(at_high % rows + 1).astype(np.float64),
        lowest_inner=(at_low >= rows).astype(np.float64),
        highest_inner=(at_high >= rows).astype(np.float64),
        fin_tip_highest=tips,
    )
