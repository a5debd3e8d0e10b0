"""A rating, or the reason why there is none, as text a person reads in a terminal."""

from collections.abc import Iterable

from crossbank.contract import (
    FieldProblem,
    InsideResult,
    MethodUsed,
    OutsideResult,
    OverallResult,
    RateResult,
    RowResult,
)
from crossbank.errors import ApiError
from crossbank.table import Line, block, grid, paragraph
from crossbank.units import SYSTEMS, Unit

Units = dict[str, Unit]
Item = tuple[str, str, float | None]
"""Label, kind of quantity, number in SI."""


def rating(result: RateResult, system: str = "metric") -> str:
    """Write a rating: headline, streams, exchanger, geometry, rows, methods, assumptions, notices, record.

    Parameters
    ----------
    result : RateResult
        What the service answered.
    system : str
        ``metric``, ``si`` or ``us``.

    Returns
    -------
    str
        Text of at most about 100 columns.
    """
    units = SYSTEMS[system]
    parts = [
        _headline(result, units),
        block("Across the tubes", _lines(_outside(result.outside), units)),
        block(f"In the tubes ({result.inside.kind})", _lines(_inside(result.inside), units)),
        block("Exchanger", _lines(_overall(result.overall), units)),
        _resistances(result.overall, units),
        block("Bank and its metal", _lines(_geometry(result), units)),
        _rows(result.rows, units),
        _methods(result.methods),
        _comparisons(result, units),
        _assumed(result),
        _notices(result),
        _record(result),
    ]
    return "\n\n".join(part for part in parts if part) + "\n"


def _lines(items: Iterable[Item], units: Units) -> list[Line]:
    return [(label, units[kind].text(si), units[kind].sign) for label, kind, si in items if si is not None]


def _headline(result: RateResult, units: Units) -> str:
    title = result.label or "Rating"
    if result.reference is not None:
        known = [
            text
            for text in (
                result.reference.equipment,
                result.reference.revision,
                result.reference.case,
                result.reference.order,
            )
            if text
        ]
        title += f"  [{' / '.join(known)}]" if known else ""
    return block(
        title,
        _lines(
            [
                ("Heat gained by the outside stream", "heat", result.duty_w),
                ("  of which latent", "heat", result.latent_duty_w or None),
                ("Outside stream enters", "temperature", result.outside.inlet_temperature_k),
                ("Outside stream leaves", "temperature", result.outside.outlet_temperature_k),
                ("Outside pressure drop", "draught", result.outside.pressure_drop_pa),
                ("Inside pressure drop", "pressure", result.inside.pressure_drop_pa),
            ],
            units,
        ),
    )


def _outside(out: OutsideResult) -> list[Item]:
    return [
        ("Mass flow", "mass-flow", out.mass_flow_kg_s),
        ("Density, inlet", "density", out.inlet_density_kg_m3),
        ("Density, outlet", "density", out.outlet_density_kg_m3),
        ("Approach velocity", "velocity", out.approach_velocity_m_s),
        ("Velocity between the tubes, greatest", "velocity", out.max_velocity_m_s),
        ("Reynolds number between the tubes", "count", out.reynolds_max),
        ("Film coefficient", "coefficient", out.heat_transfer_coefficient_w_m2_k),
        ("Fin efficiency", "number", out.fin_efficiency),
        ("Pressure drop, friction", "draught", out.friction_pressure_drop_pa),
        ("Pressure drop, momentum", "draught", out.momentum_pressure_drop_pa),
        ("Outlet pressure, absolute", "pressure", out.outlet_pressure_pa),
        ("Power to move the stream", "power", out.flow_power_w),
        ("Humidity ratio, outlet", "humidity", out.outlet_humidity_ratio),
        ("Relative humidity, outlet", "percent", out.outlet_relative_humidity),
        ("Moisture removed", "mass-flow", out.moisture_removed_kg_s or None),
    ]


def _inside(ins: InsideResult) -> list[Item]:
    return [
        ("Mass flow", "mass-flow", ins.mass_flow_kg_s),
        ("Enters", "temperature", ins.inlet_temperature_k),
        ("Leaves", "temperature", ins.outlet_temperature_k),
        ("Saturation at the inlet", "temperature", ins.saturation_temperature_k),
        ("Condensate", "mass-flow", ins.condensate_kg_s),
        ("Quality, outlet", "number", ins.outlet_quality),
        ("Subcooling, outlet", "difference", ins.outlet_subcooling_k),
        ("Velocity, inlet", "velocity", ins.inlet_velocity_m_s),
        ("Velocity, outlet", "velocity", ins.outlet_velocity_m_s),
        ("Mass flux", "mass-flux", ins.mass_flux_kg_m2_s),
        ("Reynolds number", "count", ins.reynolds),
        ("Film coefficient", "coefficient", ins.heat_transfer_coefficient_w_m2_k),
        ("Outlet pressure, absolute", "pressure", ins.outlet_pressure_pa),
    ]


def _overall(all_: OverallResult) -> list[Item]:
    return [
        ("Outside surface", "area", all_.area_m2),
        ("Overall coefficient", "coefficient", all_.coefficient_w_m2_k),
        ("Overall coefficient, clean", "coefficient", all_.coefficient_clean_w_m2_k),
        ("Conductance", "conductance", all_.ua_w_k),
        ("Mean temperature difference", "difference", all_.mean_difference_k),
        ("Logarithmic mean, counterflow", "difference", all_.log_mean_difference_k),
        ("Crossflow correction", "number", all_.crossflow_correction),
        ("Effectiveness", "number", all_.effectiveness),
        ("Transfer units", "number", all_.ntu),
        ("Closest approach", "difference", all_.closest_approach_k),
        ("Duty margin", "percent", all_.duty_margin_fraction),
        ("Excess area", "percent", all_.excess_area_fraction),
    ]


def _resistances(all_: OverallResult, units: Units) -> str:
    shares = all_.resistance_shares
    if shares is None:
        return ""
    items: list[Item] = [
        ("Outside film", "percent", shares.outside),
        ("Outside fouling", "percent", shares.outside_fouling or None),
        ("Fin bond", "percent", shares.fin_bond or None),
        ("Tube wall", "percent", shares.wall),
        ("Inside fouling", "percent", shares.inside_fouling or None),
        ("Inside film", "percent", shares.inside),
    ]
    return block("Where the resistance lies", _lines(items, units))


def _geometry(result: RateResult) -> list[Item]:
    bank, wall = result.geometry, result.wall
    return [
        ("Tubes", "count", bank.tube_count),
        ("Width across the tubes", "length", bank.width_m),
        ("Height along the tubes", "length", bank.height_m),
        ("Depth along the stream", "length", bank.depth_m),
        ("Face area", "area", bank.face_area_m2),
        ("Narrowest area", "area", bank.free_flow_area_m2),
        ("Inside surface", "area", bank.inside_area_m2),
        ("Inside volume", "volume", bank.inside_volume_m3),
        ("Mass, dry", "mass", bank.dry_mass_kg),
        ("Mass, in operation", "mass", bank.operating_mass_kg),
        ("Tube metal, coldest", "temperature", wall.min_temperature_k),
        ("Tube metal, hottest", "temperature", wall.max_temperature_k),
    ]


def _rows(rows: list[RowResult], units: Units) -> str:
    if not rows:
        return ""
    columns = (
        ("row", "count", [r.row for r in rows]),
        ("pass", "count", [r.pass_ for r in rows]),
        ("heat", "heat", [r.heat_w for r in rows]),
        ("out. in", "temperature", [r.outside_inlet_temperature_k for r in rows]),
        ("out. out", "temperature", [r.outside_outlet_temperature_k for r in rows]),
        ("inside", "temperature", [r.inside_temperature_k for r in rows]),
        ("wall", "temperature", [r.wall_temperature_k for r in rows]),
        ("Reynolds", "count", [r.reynolds_max for r in rows]),
        ("h outside", "coefficient", [r.outside_heat_transfer_coefficient_w_m2_k for r in rows]),
        ("h inside", "coefficient", [r.inside_heat_transfer_coefficient_w_m2_k for r in rows]),
        ("drop", "draught", [r.pressure_drop_pa for r in rows]),
    )
    heads = [(head, units[kind].sign) for head, kind, _ in columns]
    cells = [[units[kind].text(values[i]) for _, kind, values in columns] for i in range(len(rows))]
    return grid("Row by row along the outside stream", heads, cells)


def _methods(methods: list[MethodUsed]) -> str:
    out = ["Methods"]
    for used in methods:
        scatter = (
            "" if used.scatter_fraction is None else f", data scatter ±{100 * used.scatter_fraction:.0f} %"
        )
        inside = "within its range" if used.in_range else "OUTSIDE ITS RANGE"
        out.append(f"  {used.role.replace('_', ' ')}: {used.method} ({inside}{scatter})")
        if used.range_note:
            out.append(paragraph(used.range_note, first="    ", then="    "))
        out.append(paragraph(used.source, first="    ", then="    "))
    return "\n".join(out) if methods else ""


def _comparisons(result: RateResult, units: Units) -> str:
    if not result.comparisons:
        return ""
    kinds = ("heat", "temperature", "draught", "pressure")
    heads = [("method", ""), ("in range", "")] + [
        (head, units[kind].sign)
        for head, kind in zip(("duty", "out. out", "drop outside", "drop inside"), kinds, strict=True)
    ]
    cells = [
        [
            other.method,
            "yes" if other.in_range else "no",
            units["heat"].text(other.duty_w),
            units["temperature"].text(other.outside_outlet_temperature_k),
            units["draught"].text(other.outside_pressure_drop_pa),
            units["pressure"].text(other.inside_pressure_drop_pa),
        ]
        for other in result.comparisons
    ]
    return grid("The same by other methods", heads, cells)


def _assumed(result: RateResult) -> str:
    lines = [
        paragraph(f"{a.pointer} = {a.value:g}{_unit(a.unit)}: {a.why}", then="    ") for a in result.assumed
    ]
    return "\n".join(["Assumed, since the request left it open (SI)", *lines]) if lines else ""


def _unit(sign: str | None) -> str:
    """Write a unit after its number; a bare number has none to show."""
    return "" if sign in (None, "", "1") else f" {sign}"


def _notices(result: RateResult) -> str:
    lines = [paragraph(f"{n.severity} {n.code}: {n.text}", then="    ") for n in result.notices]
    return "\n".join(["Notices", *lines]) if lines else ""


def _record(result: RateResult) -> str:
    record = result.record
    lines = [
        f"input    {record.input_sha256}",
        f"bank     {record.bank_sha256}",
        f"service  {record.service_version}, contract {record.contract}, numbers {record.numbers}",
        f"fluids   {record.properties}",
        f"balance  {result.heat_balance_residual:.1e} after {result.iterations} iterations",
    ]
    return "\n  ".join(["Record", *lines])


def refusal(error: ApiError) -> str:
    """Write a problem as a short list: each member, what was given, what is accepted."""
    parts = [f"{error.detail} ({error.code})"]
    parts += [_fault(fault) for fault in error.errors]
    if error.request_id:
        parts.append(f"  request {error.request_id}")
    return "\n".join(parts) + "\n"


def _fault(fault: FieldProblem) -> str:
    unit = _unit(fault.unit)
    lines = [f"  {fault.pointer or '/'}"]
    if fault.given is not None:
        lines.append(f"    given     {_said(fault.given)}{unit if _is_number(fault.given) else ''}")
    accepted = _accepted(fault)
    if accepted:
        lines.append(f"    accepted  {accepted}{unit if not fault.one_of else ''}")
    lines.append(paragraph(fault.detail, first="    ", then="    "))
    return "\n".join(lines)


def _is_number(value: object) -> bool:
    return isinstance(value, int | float) and not isinstance(value, bool)


def _said(value: float | str) -> str:
    if isinstance(value, bool):
        return "true" if value else "false"
    return f"{value:g}" if isinstance(value, float) else str(value)


def _accepted(fault: FieldProblem) -> str:
    if fault.one_of:
        return ", ".join(fault.one_of)
    low, high = fault.at_least, fault.at_most
    if low is not None and high is not None:
        return f"{low:g} to {high:g}"
    if low is not None:
        return f"at least {low:g}"
    return f"at most {high:g}" if high is not None else ""
