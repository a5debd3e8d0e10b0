"""Requests that the tests of the rating draw from: plain builders, and a strategy over all that is accepted."""

from typing import Any

import msgspec
from hypothesis import strategies as st

from crossbank.contract import RateRequest, RateResult
from crossbank_service.errors import CoreError
from crossbank_service.rating import rate

Body = dict[str, Any]

AIR: Body = {"kind": "moist-air", "humidity_ratio": 0.005}
STEAM: Body = {"kind": "condensing", "fluid": "water", "inlet_pressure_pa": 3e5}
WATER: Body = {
    "kind": "single-phase",
    "fluid": "water",
    "flow_kg_s": 2.0,
    "inlet_temperature_k": 290.0,
    "inlet_pressure_pa": 4e5,
}


def constant(density: float, cp: float, conductivity: float, viscosity: float, *, gas: bool = False) -> Body:
    """A fluid whose properties do not change."""
    return {
        "kind": "table",
        "temperature_k": [300.0],
        "density_kg_m3": [density],
        "heat_capacity_j_kg_k": [cp],
        "conductivity_w_m_k": [conductivity],
        "viscosity_pa_s": [viscosity],
        "gas": gas,
    }


def mass(kg_s: float) -> Body:
    """A mass flow."""
    return {"kind": "mass", "kg_s": kg_s}


def bank(rows: int = 6, passes: int = 1, direction: str = "against", **members: Any) -> Body:
    """A bank of 25 mm steel tubes; ``members`` replace those of the layout and the tube."""
    layout: Body = {
        "arrangement": "staggered",
        "transverse_pitch_m": 0.05,
        "longitudinal_pitch_m": 0.045,
        "rows": rows,
        "tubes_per_row": 20,
        "tube_length_m": 2.0,
    }
    tube: Body = {"outer_diameter_m": 0.025, "wall_thickness_m": 0.002, "material": "carbon-steel"}
    circuit: Body = {"passes": passes, "direction": direction}
    for name, value in members.items():
        owner = layout if name in (*layout, "side_gap_m") else circuit if name == "loss_coefficient" else tube
        owner[name] = value
    return {"layout": layout, "tube": tube, "circuit": circuit}


def body(
    bank_part: Body | None = None,
    inside: Body | None = None,
    outside: Body | None = None,
    detail: Body | None = None,
    methods: Body | None = None,
    **members: Any,
) -> Body:
    """A whole request; ``outside`` adds to, or replaces, a flow of 3 kg/s of warm moist air."""
    stream: Body = {"fluid": AIR, "flow": mass(3.0), "inlet_temperature_k": 350.0}
    stream |= outside or {}
    if "elevation_m" not in stream:
        stream.setdefault("inlet_pressure_pa", 101325.0)
    return {
        "bank": bank_part or bank(),
        "outside": stream,
        "inside": inside or WATER,
        "detail": detail or {},
        "methods": methods or {},
        **members,
    }


def request(parts: Body) -> RateRequest:
    """The struct of a request body, as the service decodes it."""
    return msgspec.json.decode(msgspec.json.encode(parts), type=RateRequest)


def answer(parts: Body) -> RateResult | CoreError:
    """What a request gets."""
    return rate([request(parts)])[0]


def rated(parts: Body) -> RateResult:
    """The result of a request that can be rated."""
    found = answer(parts)
    assert isinstance(found, RateResult), found
    return found


def refused(parts: Body) -> CoreError:
    """The error of a request that cannot be rated."""
    found = answer(parts)
    assert isinstance(found, CoreError), "the request was rated"
    return found


# --- anything the schema accepts ---------------------------------------------------------------------------

_LIQUIDS = ("water", "ammonia", "ethanol", "toluene", "n-hexane", "r134a", "methanol")
_GASES = ("air", "nitrogen", "oxygen", "argon", "helium", "hydrogen", "carbon-dioxide", "methane", "water")
_SOLUTIONS = ("ethylene-glycol-water", "propylene-glycol-water", "glycerol-water", "calcium-chloride-water")
_CONDENSING = ("water", "ammonia", "r134a", "propane", "toluene", "ethanol", "n-pentane", "carbon-dioxide")
_MATERIALS = ("carbon-steel", "stainless-304", "copper", "titanium-grade-2", "aluminium")

_OUTSIDE_HEAT = (
    "auto",
    "gnielinski-zukauskas-gas",
    "gnielinski-zukauskas-liquid",
    "gnielinski-1979",
    "zukauskas-1987",
    "esdu-73031",
    "grimison-1937",
    "khan-2006",
    "churchill-bernstein-1977",
)
_OUTSIDE_DROP = (
    "auto",
    "gaddis-zukauskas-blend",
    "gaddis-gnielinski-1985",
    "zukauskas-ulinskas-1988",
    "jakob-1938",
    "gunter-shaw-1945",
)
_INSIDE_HEAT = ("auto", "cavallini-2006", "chato-1962", "dobson-chato-1998", "shah-2016", "thome-2003")
_INSIDE_DROP = ("auto", "mueller-steinhagen-heck-1986", "friedel-1979", "lockhart-martinelli-1949")


def _logarithmic(low: float, high: float) -> st.SearchStrategy[float]:
    return st.floats(0.0, 1.0).map(lambda share: float(low * (high / low) ** share))


@st.composite
def _tables(draw: st.DrawFn) -> Body:
    gas = draw(st.booleans())
    points = draw(st.integers(1, 4))
    start = draw(st.floats(200.0, 350.0))
    end = draw(st.floats(600.0, 1500.0))
    at = [start + (end - start) * i / max(points - 1, 1) for i in range(points)]

    def values(low: float, high: float) -> list[float]:
        first = draw(_logarithmic(low, high))
        return [first * draw(st.floats(0.7, 1.4)) for _ in at]

    return {
        "kind": "table",
        "temperature_k": at,
        "density_kg_m3": values(0.1, 10.0) if gas else values(500.0, 2000.0),
        "heat_capacity_j_kg_k": values(500.0, 5000.0),
        "conductivity_w_m_k": values(0.01, 0.2) if gas else values(0.05, 5.0),
        "viscosity_pa_s": values(8e-6, 5e-5) if gas else values(1e-4, 1.0),
        "gas": gas,
        "pressure_pa": 1e5 if gas and draw(st.booleans()) else None,
    }


_KINDS = ("moist-air", "gas", "liquid", "solution", "table")


@st.composite
def _fluid(draw: st.DrawFn, kind: str) -> tuple[Any, float, float]:
    """A fluid with an inlet temperature and pressure that suit it more often than not."""
    pressure = draw(st.just(101325.0) | _logarithmic(2e4, 2e6))
    match kind:
        case "moist-air":
            pressure = draw(st.just(101325.0) | st.floats(6e4, 2e5))
            temperature = draw(st.floats(240.0, 330.0) | st.floats(300.0, 900.0))
            measure = draw(
                st.sampled_from(
                    [("humidity_ratio", 0.0), ("humidity_ratio", 0.002), ("humidity_ratio", 0.05)]
                )
                | st.tuples(st.just("relative_humidity"), st.floats(0.0, 1.0))
            )
            return {"kind": "moist-air", measure[0]: measure[1]}, temperature, pressure
        case "gas":
            return draw(st.sampled_from(_GASES)), draw(st.floats(250.0, 900.0)), pressure
        case "liquid":
            name = draw(st.sampled_from(_LIQUIDS))
            return name, draw(st.floats(275.0, 420.0)), draw(st.sampled_from([2e5, 1e6, 5e6]))
        case "solution":
            name = draw(st.sampled_from(_SOLUTIONS))
            fluid = {"kind": "solution", "name": name, "mass_fraction": draw(st.floats(0.0, 0.6))}
            return fluid, draw(st.floats(250.0, 370.0)), draw(st.sampled_from([2e5, 1e6]))
        case _:
            table = draw(_tables())
            t = table["temperature_k"]
            return table, draw(st.floats(t[0], max(t[-1], t[0] + 200.0))), pressure


@st.composite
def _banks(draw: st.DrawFn) -> Body:
    d = draw(st.sampled_from([0.01, 0.016, 0.0254, 0.038, 0.06]))
    passes = draw(st.integers(1, 4))
    rows = passes * draw(st.integers(1, 4))
    arrangement = draw(st.sampled_from(["inline", "staggered"]))
    a = draw(st.floats(1.02, 4.0))
    # the next row must not touch, be it straight behind or half a pitch beside
    least = 1.0 if arrangement == "inline" else max(0.5, (1.0 - 0.25 * a * a) ** 0.5 if a < 2.0 else 0.0)
    part = bank(
        rows,
        passes,
        draw(st.sampled_from(["against", "with"])),
        arrangement=arrangement,
        transverse_pitch_m=d * a,
        longitudinal_pitch_m=d * draw(st.floats(least + 0.02, 4.0)),
        tubes_per_row=draw(st.integers(1, 60)),
        tube_length_m=draw(_logarithmic(0.2, 12.0)),
        outer_diameter_m=d,
        wall_thickness_m=d * draw(st.floats(0.01, 0.3)),
        material=draw(st.sampled_from(_MATERIALS)),
        roughness_m=draw(st.sampled_from([None, 0.0, 1e-4])),
    )
    if draw(st.booleans()):
        part["layout"]["side_gap_m"] = draw(st.floats(0.0, 0.05))
    if draw(st.booleans()):
        part["circuit"]["loss_coefficient"] = draw(st.floats(0.0, 5.0))
    return part


@st.composite
def _outsides(draw: st.DrawFn, part: Body) -> Body:
    fluid, temperature, pressure = draw(_fluid(draw(st.sampled_from(_KINDS))))
    layout = part["layout"]
    face = layout["tubes_per_row"] * layout["transverse_pitch_m"] * layout["tube_length_m"]
    flow = draw(
        st.one_of(
            _logarithmic(0.05, 20.0).map(lambda v: {"kind": "approach-velocity", "m_s": v}),
            _logarithmic(0.01, 30.0).map(lambda g: {"kind": "mass", "kg_s": g * face}),
            _logarithmic(0.1, 10.0).map(lambda v: {"kind": "actual-volume", "m3_s": v * face}),
            _logarithmic(0.1, 10.0).map(
                lambda v: {
                    "kind": "reference-volume",
                    "m3_s": v * face,
                    "reference_temperature_k": 288.15,
                    "reference_pressure_pa": 101325.0,
                }
            ),
        )
    )
    stream: Body = {
        "fluid": fluid,
        "flow": flow,
        "inlet_temperature_k": temperature,
        "fouling_m2_k_w": draw(st.sampled_from([0.0, 1e-4, 2e-3])),
    }
    if draw(st.booleans()):
        stream["inlet_pressure_pa"] = pressure
    else:
        stream["elevation_m"] = draw(st.floats(0.0, 4000.0))
    return stream


@st.composite
def _insides(draw: st.DrawFn, part: Body, kind: str) -> Body:
    fouling = draw(st.sampled_from([0.0, 2e-4]))
    match kind:
        case "held-surface":
            return {"kind": kind, "temperature_k": draw(st.floats(250.0, 900.0))}
        case "condensing":
            part["circuit"]["passes"] = 1
            inside: Body = {
                "kind": kind,
                "fluid": draw(st.sampled_from(_CONDENSING)),
                "fouling_m2_k_w": fouling,
                "inlet_superheat_k": draw(st.sampled_from([None, 0.0, 30.0])),
            }
            if draw(st.booleans()):
                inside["inlet_pressure_pa"] = draw(_logarithmic(2e4, 4e6))
            else:
                inside["saturation_temperature_k"] = draw(st.floats(270.0, 450.0))
            return inside
        case _:
            fluid, temperature, pressure = draw(_fluid(draw(st.sampled_from(_KINDS))))
            layout, tube = part["layout"], part["tube"]
            bore = tube["outer_diameter_m"] - 2.0 * tube["wall_thickness_m"]
            tubes = layout["tubes_per_row"] * layout["rows"] / part["circuit"]["passes"]
            flux = draw(_logarithmic(0.5, 2000.0))
            return {
                "kind": kind,
                "fluid": fluid,
                "flow_kg_s": flux * 0.785 * bore**2 * tubes,
                "inlet_temperature_k": temperature,
                "inlet_pressure_pa": pressure,
                "fouling_m2_k_w": fouling,
            }


@st.composite
def any_requests(draw: st.DrawFn) -> Body:
    """A request of any kind, sound in form; most can be rated, some contradict themselves."""
    part = draw(_banks())
    kind = draw(st.sampled_from(["held-surface", "condensing", "single-phase", "single-phase"]))
    inside = draw(_insides(part, kind))
    lumped = draw(st.integers(0, 3)) == 0
    detail: Body = {"resolution": "bank" if lumped else "row"}
    if lumped:
        detail["property_state"] = draw(st.sampled_from(["inlet", "mean"]))
    methods = {
        "outside_heat_transfer": draw(st.sampled_from(_OUTSIDE_HEAT)),
        "outside_pressure_drop": draw(st.sampled_from(_OUTSIDE_DROP)),
    }
    if kind == "condensing":
        methods["inside_heat_transfer"] = draw(st.sampled_from(_INSIDE_HEAT))
        methods["inside_pressure_drop"] = draw(st.sampled_from(_INSIDE_DROP))
    return body(part, inside, draw(_outsides(part)), detail, methods)
