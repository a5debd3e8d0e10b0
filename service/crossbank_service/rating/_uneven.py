"""An outside stream that does not cross the bank evenly: bypass, open lanes, zones of the face.

Each zone is the bank at a flow of its own, and counts by its share of the face; the inside stream serves every zone
with its share of the tubes. What passes by the bank, through a duct or through lanes, leaves unheated. The streams mix
behind the bank. A lane and the bank lie between the same pressures, so their velocities are as the roots of their
losses: u_lane/u_max = sqrt(n xi/(f L/D_h + K)), D_h twice the lane's width, f and K of a smooth open slot (common
practice,
no source); strips shut a lane by (2 s)^(1/3), s strips a row, as in Taborek's form of Bell's bypass correction (HEDH
3.3).
"""

from collections.abc import Sequence
from dataclasses import dataclass, fields, replace
from typing import TypeVar

import numpy as np

from crossbank_service.rating import _engine
from crossbank_service.rating._arrays import Array, Cases
from crossbank_service.rating._case import Case
from crossbank_service.rating._engine import Rated
from crossbank_service.rating._fluids import medium_of
from crossbank_service.rating._outside import temperature_of
from crossbank_service.rating._performance import Performance

LANE_FRICTION = 0.03
LANE_LOSSES = 1.5
LANE_ROUNDS = 30
LANE_TOLERANCE = 1e-9

T = TypeVar("T", bound=Cases)


@dataclass(frozen=True)
class Unevenness:
    """What an uneven stream does to a case.

    Attributes
    ----------
    bypass : float
        Share of the stream that leaves unheated, lanes included.
    loss : float
        Share of the duty lost against an even stream through the whole bank.
    spread : float
        Between the hottest and the coldest of the streams behind the bank [K].
    """

    bypass: float
    loss: float
    spread: float


def perform(cases: Sequence[Case]) -> list[tuple[Rated, Unevenness | None]]:
    """Rate cases, the uneven ones zone by zone; in order."""
    shares = _lane_shares(cases)
    parts: list[Case] = []
    slices: list[slice] = []
    for case, lane in zip(cases, shares, strict=True):
        start = len(parts)
        parts += _zones(case, lane) if case.uneven else [case]
        slices.append(slice(start, len(parts)))
    rated = _engine.perform(parts)
    return [
        (_joined(case, lane, rated[part]), _unevenness(case, lane, rated[part]))
        if case.uneven
        else (rated[part][0], None)
        for case, lane, part in zip(cases, shares, slices, strict=True)
    ]


def _zones(case: Case, lane: float) -> list[Case]:
    """The bank at the flow of each zone, and last at the even flow of the whole stream."""
    even = replace(case, lanes=(), zones=(), bypass=0.0)
    through = case.outside_flow * (1.0 - case.bypass) * (1.0 - lane)
    ratios = [ratio for _, ratio in case.zones] or [1.0]
    return [*(replace(even, outside_flow=through * ratio) for ratio in ratios), even]


def _lane_shares(cases: Sequence[Case]) -> list[float]:
    """Share of each case's flow through its face that takes the lanes, from equal losses."""
    shares = [0.0] * len(cases)
    open_ones = [i for i, case in enumerate(cases) if case.lanes and case.outside_flow > 0.0]
    for _ in range(LANE_ROUNDS):
        if not open_ones:
            break
        flows = [cases[i].outside_flow * (1.0 - cases[i].bypass) * (1.0 - shares[i]) for i in open_ones]
        trial = [
            replace(cases[i], outside_flow=flow, lanes=(), zones=(), bypass=0.0)
            for i, flow in zip(open_ones, flows, strict=True)
        ]
        moved = []
        for i, case, (found, _) in zip(open_ones, trial, _engine.perform(trial), strict=True):
            share = _lane_share(cases[i], case, found)
            if abs(share - shares[i]) > LANE_TOLERANCE:
                moved.append(i)
            shares[i] = share
        open_ones = moved
    return shares


def _lane_share(case: Case, rated: Case, found: Performance) -> float:
    bank = _engine.bank_of(rated.sections[:1])
    free, length = float(bank.free_area[0]), case.bank["tube_length"]
    flux = rated.outside_flow / free
    density = rated.outside_flow / (float(found.outside.max_velocity[0]) * free)
    heads = float(found.outside.friction_drop[0]) / (flux * flux / (2.0 * density))
    depth = case.circuit.rows * case.bank["longitudinal_pitch"]
    passing = 0.0
    for width, strips in case.lanes:
        ratio = np.sqrt(heads / (LANE_FRICTION * depth / (2.0 * width) + LANE_LOSSES))
        sealed = min(2.0 * strips / case.circuit.rows, 1.0) ** (1.0 / 3.0)
        passing += width * length * float(ratio) * (1.0 - sealed)
    return passing / (free + passing)


def _mean(values: Sequence[T], weights: Sequence[float]) -> T:
    """Members of ``values`` averaged by weight."""
    first = values[0]
    out: dict[str, object] = {}
    for f in fields(first):  # type: ignore[arg-type]
        members = [getattr(value, f.name) for value in values]
        if members[0] is None:
            out[f.name] = None
        elif isinstance(members[0], Cases):
            out[f.name] = _mean(members, weights)
        else:
            out[f.name] = sum(
                (w * m for w, m in zip(weights, members, strict=True)), np.zeros_like(members[0])
            )
    return type(first)(**out)


def _joined(case: Case, lane: float, rated: Sequence[Rated]) -> Rated:
    """One performance from those of the zones; the last of ``rated`` is the even stream."""
    zones, even = [performance for performance, _ in rated[:-1]], rated[-1][0]
    areas = [share for share, _ in case.zones] or [1.0]
    ratios = [ratio for _, ratio in case.zones] or [1.0]
    flows = [a * r for a, r in zip(areas, ratios, strict=True)]
    mean = _mean(zones, areas)
    outlet = _mixed_outlet(case, lane, zones, flows)
    density = medium_of([case.outside_fluid]).at(outlet, even.outside.outlet_pressure).density_kg_m3

    def widest(name: str, part: str, pick: np.ufunc) -> Array:
        return np.asarray(pick.reduce([getattr(getattr(z, part), name) for z in zones]))

    outside = replace(
        mean.outside,
        outlet_temperature=outlet,
        outlet_density=density,
        outlet_pressure=case.outside_pressure - mean.outside.friction_drop - mean.outside.momentum_drop,
        approach_velocity=even.outside.approach_velocity * _face_share(case),
        max_velocity=widest("max_velocity", "outside", np.maximum),
        bulk_min=widest("bulk_min", "outside", np.minimum),
        bulk_max=widest("bulk_max", "outside", np.maximum),
        face_min=widest("face_min", "outside", np.minimum),
        face_max=widest("face_max", "outside", np.maximum),
        choked=widest("choked", "outside", np.maximum),
    )
    inside = mean.inside
    if inside is not None:
        inside = replace(
            inside,
            **{
                name: widest(name, "inside", np.minimum if name.endswith("min") else np.maximum)
                for name in ("bulk_min", "bulk_max", "face_min", "face_max", "choked")
            },
        )
    wet = mean.wet
    if wet is not None:
        humidity = _mean([z.wet for z in zones if z.wet is not None], flows).outlet_humidity
        passing = _passing(case, lane)
        inlet = case.humidity_ratio or 0.0
        wet = replace(wet, outlet_humidity=(1.0 - passing) * humidity + passing * inlet)
    coldest = min(range(len(zones)), key=lambda i: float(zones[i].wall.lowest[0]))
    hottest = max(range(len(zones)), key=lambda i: float(zones[i].wall.highest[0]))
    low, high = zones[coldest].wall, zones[hottest].wall
    wall = replace(
        high,
        lowest=low.lowest,
        lowest_row=low.lowest_row,
        lowest_inner=low.lowest_inner,
        fin_tip_highest=widest("fin_tip_highest", "wall", np.maximum),
    )
    duty, ua = mean.duty, mean.overall.ua
    greatest = np.abs(even.duty) / even.overall.effectiveness
    overall = replace(
        mean.overall,
        log_mean=np.full_like(duty, np.nan),
        correction=np.full_like(duty, np.nan),
        mean_difference=np.abs(duty) / ua,
        effectiveness=np.abs(duty) / greatest,
        ntu=ua * even.overall.ntu / even.overall.ua,
        closest_approach=np.asarray(np.minimum.reduce([z.overall.closest_approach for z in zones])),
    )
    joined = replace(
        mean,
        wet=wet,
        outside=outside,
        inside=inside,
        overall=overall,
        wall=wall,
        residual=np.asarray(np.maximum.reduce([z.residual for z in zones])),
        iterations=np.asarray(np.maximum.reduce([z.iterations for z in zones])),
        change=np.asarray(np.maximum.reduce([z.change for z in zones])),
    )
    used = tuple(each for _, ranges in rated[:-1] for each in ranges)
    return joined, _engine.distinct(list(used))


def _passing(case: Case, lane: float) -> float:
    """Share of the whole stream that leaves unheated."""
    return 1.0 - (1.0 - case.bypass) * (1.0 - lane)


def _face_share(case: Case) -> float:
    """Face of the tubes over that of the duct with its lanes; what a duct bypass takes is not approaching."""
    width = float(_engine.bank_of(case.sections[:1]).width[0])
    return (1.0 - case.bypass) * width / (width + sum(w for w, _ in case.lanes))


def _mixed_outlet(case: Case, lane: float, zones: Sequence[Performance], flows: Sequence[float]) -> Array:
    """Temperature behind the bank when all streams have mixed [K]."""
    medium = medium_of([case.outside_fluid])
    pressure = np.array([case.outside_pressure])
    passing = _passing(case, lane)
    inlet = np.array([case.outside_temperature])
    parts = [(passing, inlet)]
    parts += [((1.0 - passing) * f, z.outside.outlet_temperature) for f, z in zip(flows, zones, strict=True)]
    enthalpy = sum((share * medium.enthalpy(t, pressure) for share, t in parts), np.zeros(1))
    start = sum((share * t for share, t in parts), np.zeros(1))
    return temperature_of(medium, enthalpy, start, pressure)


def _unevenness(case: Case, lane: float, rated: Sequence[Rated]) -> Unevenness:
    zones, even = [performance for performance, _ in rated[:-1]], rated[-1][0]
    areas = [share for share, _ in case.zones] or [1.0]
    duty = sum(a * float(z.duty[0]) for a, z in zip(areas, zones, strict=True))
    whole = float(even.duty[0])
    outlets = [float(z.outside.outlet_temperature[0]) for z in zones]
    passing = _passing(case, lane)
    if passing > 0.0:
        outlets.append(case.outside_temperature)
    return Unevenness(
        bypass=passing,
        loss=1.0 - duty / whole if whole else 0.0,
        spread=max(outlets) - min(outlets),
    )
