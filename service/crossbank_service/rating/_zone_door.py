"""Zones of an uneven face at the door."""

from crossbank.contract import Outside
from crossbank_service.rating._faults import Faults

CLOSURE = 1e-3


def zones_of(outside: Outside, faults: Faults) -> tuple[tuple[float, float], ...]:
    """Area share and velocity ratio of each zone, made to sum exactly; empty for an even stream."""
    zones = outside.distribution
    if not zones:
        return ()
    area = sum(zone.area_share for zone in zones)
    flow = sum(zone.area_share * zone.velocity_ratio for zone in zones)
    if abs(area - 1.0) > CLOSURE:
        faults.refuse(
            "/outside/distribution",
            f"The area shares of the zones sum to {area:.6g}; together they are the face, 1.",
            area,
            "1",
            at_least=1.0 - CLOSURE,
            at_most=1.0 + CLOSURE,
        )
    elif abs(flow - 1.0) > CLOSURE:
        faults.refuse(
            "/outside/distribution",
            f"Area share times velocity ratio sums to {flow:.6g} over the zones; the mean velocity ratio is 1.",
            flow,
            "1",
            at_least=1.0 - CLOSURE,
            at_most=1.0 + CLOSURE,
        )
    return tuple(
        (zone.area_share / area, zone.velocity_ratio * area / flow) for zone in zones if zone.area_share > 0.0
    )
