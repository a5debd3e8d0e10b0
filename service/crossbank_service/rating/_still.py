"""The inside stream of a case without heat: it keeps its temperature and loses only its own pressure."""

import numpy as np

from crossbank_service.rating import _engine, _single_phase
from crossbank_service.rating._case import Case
from crossbank_service.rating._network import Field
from crossbank_service.rating._performance import InsideFound
from crossbank_service.rating._single_phase import SinglePhaseStream


def still_inside(case: Case) -> InsideFound | None:
    """The inside of a case that exchanges no heat; None for a held surface."""
    inside = case.inside
    zero, t, p = np.zeros(1), np.array([inside.temperature]), np.array([inside.pressure])
    drop, flux, density, reynolds, velocity = zero, zero, zero, zero, zero
    if inside.kind == "single-phase":
        problem = _engine.problem_of([case])
        stream = problem.inside
        assert isinstance(stream, SinglePhaseStream)
        density = stream.medium.at(t, p).density_kg_m3
        if inside.flow > 0.0:
            shape = (1, case.circuit.rows, 1)
            still = np.full(shape, inside.temperature)
            field = Field(still, still, still, still, still, np.zeros(shape))
            pressure = np.full((1, case.circuit.passes + 1), inside.pressure)
            film = _single_phase.film(problem.bank, stream, case.circuit, field, still, pressure)
            drop = stream.inlet_pressure - film.pressure[:, -1]
            flux = film.flux.max(axis=1)
            reynolds = film.reynolds.mean(axis=2).mean(axis=1)
            velocity = flux / density
    hot = t + inside.superheat
    return InsideFound(
        flow=np.array([inside.flow]),
        inlet_temperature=hot,
        outlet_temperature=hot,
        outlet_pressure=p - drop,
        drop=drop,
        coefficient=zero,
        inlet_velocity=velocity,
        outlet_velocity=velocity,
        flux=flux,
        reynolds=reynolds,
        density=density,
        bulk_min=t,
        bulk_max=t,
        face_min=t,
        face_max=t,
        choked=(drop > 0.5 * p).astype(np.float64),
    )
