"""From checked cases to performances: cases of one shape share an array, arrays stay small enough for the cache."""

from collections import defaultdict
from collections.abc import Sequence
from dataclasses import replace
from typing import Any

import numpy as np

from crossbank_service import properties
from crossbank_service.banks import FinSet, TubeBank
from crossbank_service.properties import Medium
from crossbank_service.rating import _lumped, _performance, _solver
from crossbank_service.rating._arrays import Array
from crossbank_service.rating._case import Case, FluidInput, InsideInput, SectionInput, narrow
from crossbank_service.rating._condensing import CondensingStream, entering_enthalpy
from crossbank_service.rating._fluids import local_medium, medium_of
from crossbank_service.rating._methods import method
from crossbank_service.rating._outside import OutsideStream
from crossbank_service.rating._performance import Performance
from crossbank_service.rating._ranges import ArrayRange, MethodRange, ranges
from crossbank_service.rating._section import Section
from crossbank_service.rating._single_phase import SinglePhaseStream
from crossbank_service.rating._solver import HeldSurface, InsideStream, Problem
from crossbank_service.rating._wet import Moisture

CELLS_PER_CHUNK = 16_000
"""Arrays of this many numbers stay in a core's cache, and one chunk takes a few tens of milliseconds."""

STILL_FLOW = 1e-6
"""Stands for no flow [kg/s] in a rating whose heat and losses are then written as 0."""

Rated = tuple[Performance, tuple[MethodRange, ...]]


def adiabatic(case: Case) -> Case:
    """The case with surfaces at the temperature of the outside stream: its pressure drop without heat."""
    return replace(
        case,
        inside=InsideInput("held-surface", temperature=case.outside_temperature),
        outside_flow=case.outside_flow or STILL_FLOW,
        segments=1,
        methods={},
        zones=(),
        lanes=(),
        bypass=0.0,
    )


def perform(cases: Sequence[Case]) -> list[Rated]:
    """Rate cases; one performance (of one case) and the ranges of its methods each, in order."""
    groups: dict[tuple[object, ...], list[int]] = defaultdict(list)
    for i, case in enumerate(cases):
        groups[case.group].append(i)
    out: list[Rated | None] = [None] * len(cases)
    for members in groups.values():
        first = cases[members[0]]
        size = max(1, CELLS_PER_CHUNK // (first.circuit.rows * first.segments))
        for start in range(0, len(members), size):
            chunk = members[start : start + size]
            problem = problem_of([cases[i] for i in chunk])
            performance, found = rate_problem(problem, first.property_state)
            single = performance.each(len(chunk))
            for place, i in enumerate(chunk):
                out[i] = (
                    single[place],
                    distinct([each.of_case(place) for each in found]),
                )
    return [each for each in out if each is not None]


def rate_problem(problem: Problem, property_state: str) -> tuple[Performance, list[ArrayRange]]:
    """Rate the cases of one array."""
    if property_state == "local":
        solution = _solver.solve(problem)
        return _performance.of_solution(problem, solution), ranges(problem, solution)
    lump = _lumped.solve(problem, property_state)
    return _performance.of_lump(problem, lump), ranges(problem, lump)


def problem_of(cases: Sequence[Case]) -> Problem:
    """The arrays of cases of one group."""
    first = cases[0]
    return Problem(
        sections=tuple(_section([case.sections[i] for case in cases]) for i in range(len(first.sections))),
        outside=OutsideStream(
            medium=_medium(cases, [case.outside_fluid for case in cases], _column(cases, "outside_pressure")),
            mass_flow=_column(cases, "outside_flow"),
            inlet_temperature=_column(cases, "outside_temperature"),
            inlet_pressure=_column(cases, "outside_pressure"),
            fouling=_column(cases, "outside_fouling"),
        ),
        inside=_inside(cases),
        circuit=first.circuit,
        segments=first.segments,
        moisture=_moisture(cases),
    )


def _column(cases: Sequence[Case], name: str) -> Array:
    return np.array([getattr(case, name) for case in cases])


def _moisture(cases: Sequence[Case]) -> Moisture | None:
    """The vapour in the outside streams; None where no surface could be below its dew point."""
    if not cases[0].may_be_wet:
        return None
    humidity = _column(cases, "humidity_ratio")
    return Moisture(
        dry_flow=_column(cases, "outside_flow") / (1.0 + humidity),
        humidity=humidity,
        molar_ratio=_column(cases, "molar_ratio"),
    )


def distinct(used: list[MethodRange]) -> tuple[MethodRange, ...]:
    """The methods of a case: row groups that share one say it once, out of range if it is in either."""
    kept: dict[tuple[str, str], MethodRange] = {}
    for each in used:
        key = each.method.role, each.method.slug
        if key not in kept or not each.within:
            kept[key] = each
    return tuple(kept.values())


def bank_of(sections: Sequence[SectionInput]) -> TubeBank:
    """The geometry of the same rows of some cases."""

    def column(name: str) -> Array:
        return np.array([section.bank[name] for section in sections])

    numbers: Any = {name: column(name) for name in sections[0].bank}
    bank = TubeBank(**numbers)
    kind = sections[0].kind
    if kind == "plain":
        return bank
    return replace(
        bank,
        fins=FinSet(kind, **{name: np.array([s.fins[name] for s in sections]) for name in sections[0].fins}),
    )


def _section(sections: Sequence[SectionInput]) -> Section:
    first = sections[0]
    finned = first.kind != "plain"
    return Section(
        first=first.first,
        last=first.last,
        bank=bank_of(sections),
        metal=properties.Curve.of([section.conductivity for section in sections]),
        fin_metal=properties.Curve.of([section.fin_conductivity for section in sections]) if finned else None,
        bond=np.array([section.bond for section in sections]),
        heat_method=method("outside_heat_transfer", first.heat_method),
        drop_method=method("outside_pressure_drop", first.drop_method),
        yaw=np.array([section.yaw for section in sections]),
        counted_from=first.counted_from,
    )


def _medium(cases: Sequence[Case], fluids: Sequence[FluidInput], pressure: Array) -> Medium:
    if not narrow(fluids[0], cases[0].span):
        return medium_of(fluids)
    ends = _column(cases, "outside_temperature"), np.array([case.inside.temperature for case in cases])
    return local_medium(fluids, ends, pressure)


def _inside_medium(cases: Sequence[Case], fluids: Sequence[FluidInput]) -> Medium:
    # a pure gas may lose much of its pressure inside, and with it more than its density
    if fluids[0].gas and fluids[0].family[0] == "pure":
        return medium_of(fluids)
    return _medium(cases, fluids, np.array([case.inside.pressure for case in cases]))


def _inside(cases: Sequence[Case]) -> InsideStream:
    first = cases[0]
    insides = [case.inside for case in cases]

    def column(name: str) -> Array:
        return np.array([getattr(inside, name) for inside in insides])

    if first.inside.kind == "held-surface":
        return HeldSurface(column("temperature"))
    heat = method("inside_heat_transfer", first.methods["inside_heat_transfer"])
    drop = method("inside_pressure_drop", first.methods["inside_pressure_drop"])
    if first.inside.kind == "single-phase":
        return SinglePhaseStream(
            medium=_inside_medium(cases, [inside.fluid for inside in insides if inside.fluid]),
            mass_flow=column("flow"),
            inlet_temperature=column("temperature"),
            inlet_pressure=column("pressure"),
            fouling=column("fouling"),
            loss_heads=column("loss_heads"),
            heat_method=heat,
            drop_method=drop,
        )
    assert first.inside.fluid is not None
    name = first.inside.fluid.family[1]
    saturation = properties.Saturation(name)
    enthalpy, density = entering_enthalpy(name, saturation, column("pressure"), column("superheat"))
    return CondensingStream(
        saturation=saturation,
        inlet_pressure=column("pressure"),
        superheat=column("superheat"),
        inlet_enthalpy=enthalpy,
        inlet_density=density,
        fouling=column("fouling"),
        loss_heads=column("loss_heads"),
        hydrocarbon=np.full(len(cases), float(saturation.hydrocarbon)),
        heat_method=heat,
        drop_method=drop,
    )
