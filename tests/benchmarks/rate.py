"""Time one rating and an array of ratings against a plain scalar march through the rows.

    python tests/benchmarks/rate.py [--cases 10000] [--repeats 5]

The march is what an engineer writes for one bank: properties from CoolProp in every row, coefficients and friction
from `ht` and `fluids`, one row after the other, each repeated until its temperatures stand still. Both sides use the
same correlations where the libraries have them, so that the answers can be laid beside each other. Nothing here is
asserted: a benchmark says what it measured, on this machine, now.
"""

import argparse
import json
import math
import sys
import time
from collections.abc import Callable, Sequence
from dataclasses import dataclass
from functools import partial
from pathlib import Path
from typing import Any

import fluids
import ht
import msgspec
import numpy as np
from CoolProp.CoolProp import PropsSI
from CoolProp.HumidAirProp import HAPropsSI

from crossbank.contract import RateRequest, RateResult
from crossbank_service.errors import CoreError
from crossbank_service.rating import _engine, rate
from crossbank_service.rating._case import Case
from crossbank_service.rating._door import enter

EXAMPLES = Path(__file__).parents[2] / "client" / "crossbank" / "examples"
GRAVITY = 9.80665
STEEL_W_M_K = 50.0
PASS_LOSS_HEADS = 1.5
STILL_K = 1e-6
SAMPLE = 40
METHODS = {
    "veneer-dryer-heater": {
        "outside_heat_transfer": "gnielinski-1979",
        "outside_pressure_drop": "zukauskas-ulinskas-1988",
        "inside_heat_transfer": "chato-1962",
    },
    "press-section-heat-recovery": {
        "outside_heat_transfer": "gnielinski-1979",
        "outside_pressure_drop": "zukauskas-ulinskas-1988",
        "inside_heat_transfer": "gnielinski-1976",
        "inside_pressure_drop": "churchill-1977",
    },
}
"""The methods that both sides have."""


@dataclass(frozen=True)
class Answer:
    """What both sides are compared by [W], [K], [Pa]."""

    duty: float
    outlet: float
    outside_drop: float
    inside_drop: float | None

    @classmethod
    def of(cls, result: RateResult) -> "Answer":
        """The same numbers of a result; vapour's drop is left out, the march has none."""
        drop = result.inside.pressure_drop_pa if result.inside.kind == "single-phase" else None
        return cls(result.duty_w, result.outside.outlet_temperature_k, result.outside.pressure_drop_pa, drop)


class March:
    """One bank, one row after the other, in plain floats.

    Parameters
    ----------
    request : dict
        A request as it is written on the wire, with moist air outside.
    """

    def __init__(self, request: dict[str, Any]) -> None:
        layout, tube = request["bank"]["layout"], request["bank"]["tube"]
        self.d = tube["outer_diameter_m"]
        self.bore = self.d - 2.0 * tube["wall_thickness_m"]
        self.st, self.sl = layout["transverse_pitch_m"], layout["longitudinal_pitch_m"]
        self.rows, self.tubes, self.length = layout["rows"], layout["tubes_per_row"], layout["tube_length_m"]
        self.roughness = tube.get("roughness_m", 4.5e-5)
        outside, self.inside = request["outside"], request["inside"]
        self.t_in = outside["inlet_temperature_k"]
        self.p = (
            outside.get("inlet_pressure_pa")
            or 101325.0 * (1.0 - 2.25577e-5 * outside["elevation_m"]) ** 5.2559
        )
        fluid = outside["fluid"]
        w = fluid.get("humidity_ratio")
        if w is None:
            w = HAPropsSI("W", "T", self.t_in, "P", self.p, "R", fluid["relative_humidity"])
        self.w = w
        face = self.tubes * self.st * self.length
        gap = min(self.st - self.d, 2.0 * (math.hypot(0.5 * self.st, self.sl) - self.d))
        flow = outside["flow"]
        self.flow = (
            flow["kg_s"] if flow["kind"] == "mass" else flow["m_s"] * face / self.air("Vha", self.t_in)
        )
        self.sigma = gap / self.st
        self.face_flux = self.flow / face
        self.flux = self.face_flux / self.sigma
        self.area = math.pi * self.d * self.length * self.tubes
        self.fouling = outside.get("fouling_m2_k_w", 0.0)
        self.inside_fouling = self.inside.get("fouling_m2_k_w", 0.0)
        self.wall = self.d * math.log(self.d / self.bore) / (2.0 * STEEL_W_M_K)

    def air(self, name: str, temperature: float) -> float:
        """A property of the humid air."""
        return float(HAPropsSI(name, "T", temperature, "P", self.p, "W", self.w))

    def outside_film(self, bulk: float, face: float) -> tuple[float, float]:
        """Coefficient of a row [W/(m2 K)] and the heat capacity [J/(kg K)]; Gnielinski 1979."""
        cp, mu, k = self.air("Cha", bulk), self.air("M", bulk), self.air("K", bulk)
        own = self.flux * self.d / mu * self.sigma * 0.5 * math.pi
        nu = ht.conv_tube_bank.Nu_HEDH_tube_bank(own, mu * cp / k, self.d, self.rows, self.sl, self.st)
        heated = min(bulk / face, 1.0) ** 0.12
        return nu * 2.0 / math.pi * heated * k / self.d, cp

    def row_drop(self, first: float, last: float) -> float:
        """Friction and momentum of a row [Pa]; Zukauskas from its charts."""
        bulk = 0.5 * (first + last)
        rho = 1.0 / self.air("Vha", bulk)
        re = self.flux * self.d / self.air("M", bulk)
        friction = ht.conv_tube_bank.dP_Zukauskas(re, 1, self.st, self.sl, self.d, rho, self.flux / rho)
        return float(friction + self.face_flux**2 * (self.air("Vha", last) - self.air("Vha", first)))

    def condensing(self) -> Answer:
        """March of a steam heater: saturation is read once, the film of every row after Chato."""
        p = self.inside["inlet_pressure_pa"]
        t_sat = PropsSI("T", "P", p, "Q", 0, "Water")
        rho_l, rho_v = (PropsSI("D", "P", p, "Q", q, "Water") for q in (0, 1))
        mu, k, cp_l = (PropsSI(name, "P", p, "Q", 0, "Water") for name in ("V", "L", "C"))
        latent = PropsSI("H", "P", p, "Q", 1, "Water") - PropsSI("H", "P", p, "Q", 0, "Water")
        group = GRAVITY * rho_l * (rho_l - rho_v) * k**3 / (mu * self.bore)
        stream, drop, duty = self.t_in, 0.0, 0.0
        inner = outer = t_sat - 1.0
        for _ in range(self.rows):
            last = stream
            while True:
                h, cp = self.outside_film(0.5 * (stream + last), outer)
                dt = max(t_sat - inner, 1e-3)
                h_in = 0.555 * (group * (latent + 0.375 * cp_l * dt) / dt) ** 0.25
                inside = self.d / self.bore * (1.0 / h_in + self.inside_fouling)
                ua = self.area / (1.0 / h + self.fouling + self.wall + inside)
                before, last = last, stream - (t_sat - stream) * math.expm1(-ua / (self.flow * cp))
                heat = self.flow * cp * (last - stream)
                inner = t_sat - heat / self.area * self.d / self.bore / h_in
                outer = t_sat - heat / self.area * (inside + self.wall)
                if abs(last - before) < STILL_K:
                    break
            drop += self.row_drop(stream, last)
            duty += heat
            stream = last
        return Answer(duty, stream, drop, None)

    def liquid(self) -> Answer:
        """March of a liquid in as many passes as rows, against the air: its outlet is sought by secants."""
        target = self.inside["inlet_temperature_k"]
        first = target + 0.1 * (self.t_in - target)
        found = self._liquid_march(first)
        guess = first - (found[0] - target)
        for _ in range(20):
            again = self._liquid_march(guess)
            if abs(again[0] - target) < STILL_K:
                return again[1]
            slope = (again[0] - found[0]) / (guess - first)
            first, found, guess = guess, again, guess - (again[0] - target) / slope
        raise ArithmeticError("the march did not meet the inlet temperature")

    def _liquid_march(self, leaving: float) -> tuple[float, Answer]:
        """From the air's inlet through the rows; returns the liquid's inlet temperature it ends at."""
        fluid, p = self.inside["fluid"], self.inside["inlet_pressure_pa"]
        name = f"INCOMP::MEG[{fluid['mass_fraction']}]"
        flow = self.inside["flow_kg_s"]
        flux = flow / (self.tubes * 0.25 * math.pi * self.bore**2)

        def of_liquid(prop: str, temperature: float) -> float:
            return float(PropsSI(prop, "T", temperature, "P", p, name))

        stream, out, drop, inside_drop, duty = self.t_in, leaving, 0.0, 0.0, 0.0
        inner = outer = 0.5 * (stream + out)
        for _ in range(self.rows):
            last, entering = stream, out
            while True:
                h, cp = self.outside_film(0.5 * (stream + last), outer)
                bulk = 0.5 * (out + entering)
                mu, k, cp_l = of_liquid("V", bulk), of_liquid("L", bulk), of_liquid("C", bulk)
                re, pr = flux * self.bore / mu, mu * cp_l / k
                smooth = (1.8 * math.log10(re) - 1.5) ** -2
                nu = ht.conv_internal.turbulent_Gnielinski(re, pr, smooth)
                nu *= 1.0 + (self.bore / self.length) ** (2.0 / 3.0)
                nu *= (pr / of_liquid("Prandtl", inner)) ** 0.11
                h_in = nu * k / self.bore
                inside = self.d / self.bore * (1.0 / h_in + self.inside_fouling)
                ua = self.area / (1.0 / h + self.fouling + self.wall + inside)
                c_out, c_in = self.flow * cp, flow * cp_l
                share = -c_out * math.expm1(-ua / c_out) / c_in
                entering = stream + (out - stream) * math.exp(share)
                heat = c_in * (out - entering)
                before, last = last, stream - heat / c_out
                inner = bulk + heat / self.area * self.d / self.bore / h_in
                outer = bulk + heat / self.area * (inside + self.wall)
                if abs(last - before) < STILL_K:
                    break
            rho = of_liquid("D", bulk)
            friction = fluids.friction_factor(re, self.roughness / self.bore, Method="Churchill_1977")
            inside_drop += (friction * self.length / self.bore + PASS_LOSS_HEADS) * flux**2 / (2.0 * rho)
            drop += self.row_drop(stream, last)
            duty -= heat
            stream, out = last, entering
        return out, Answer(duty, stream, drop, inside_drop)

    def answer(self) -> Answer:
        """March by the kind of the inside."""
        return self.condensing() if self.inside["kind"] == "condensing" else self.liquid()


def best(action: Callable[[], object], repeats: int, count: int = 1) -> float:
    """Least processor time of some repeats [s], each of ``count`` calls: other work on the machine does not count."""
    times = []
    for _ in range(repeats):
        start = time.process_time()
        for _ in range(count):
            action()
        times.append((time.process_time() - start) / count)
    return min(times)


def variants(body: dict[str, Any], count: int) -> list[dict[str, Any]]:
    """Requests that all differ: geometry, flows, temperatures, humidity, fouling."""
    rng = np.random.default_rng(20240229)

    def about(value: float, spread: float) -> float:
        return float(value * rng.uniform(1.0 - spread, 1.0 + spread))

    out = []
    for _ in range(count):
        case = json.loads(json.dumps(body))
        layout, outside, inside = case["bank"]["layout"], case["outside"], case["inside"]
        layout["transverse_pitch_m"] = about(layout["transverse_pitch_m"], 0.03)
        layout["longitudinal_pitch_m"] = about(layout["longitudinal_pitch_m"], 0.03)
        layout["tube_length_m"] = about(layout["tube_length_m"], 0.2)
        layout["tubes_per_row"] = int(rng.integers(16, 26))
        for name in ("kg_s", "m_s"):
            if name in outside["flow"]:
                outside["flow"][name] = about(outside["flow"][name], 0.4)
        for name in ("humidity_ratio", "relative_humidity"):
            if name in outside["fluid"]:
                outside["fluid"][name] = about(outside["fluid"][name], 0.2)
        outside["inlet_temperature_k"] += float(rng.uniform(-8.0, 8.0))
        outside["fouling_m2_k_w"] = float(rng.uniform(0.0, 3e-4))
        inside["inlet_pressure_pa"] = about(inside["inlet_pressure_pa"], 0.3)
        if "flow_kg_s" in inside:
            inside["flow_kg_s"] = float(inside["flow_kg_s"] * rng.uniform(1.1, 1.5))
            inside["inlet_temperature_k"] += float(rng.uniform(-2.0, 8.0))
        out.append(case)
    return out


def say(text: str = "") -> None:
    """Print a line."""
    sys.stdout.write(text + "\n")
    sys.stdout.flush()


def requests_of(bodies: Sequence[dict[str, Any]], chosen: dict[str, Any]) -> list[RateRequest]:
    """Requests with some members chosen for all of them."""
    return [msgspec.convert(body | chosen, RateRequest) for body in bodies]


def settings(methods: dict[str, str]) -> dict[str, dict[str, Any]]:
    """Ways to ask: with the march's methods, with its one cell a row as well, and as by default."""
    one_cell = {"methods": methods, "detail": {"segments": 1}}
    return {"same methods": {"methods": methods}, "same, 1 cell a row": one_cell, "by default": {}}


def cases_of(requests: Sequence[RateRequest]) -> list[Case]:
    """Checked cases."""
    entered = [enter(request) for request in requests]
    refused = [each for each in entered if not isinstance(each, Case)]
    if refused:
        raise ValueError(f"{len(refused)} of the requests were refused, the first: {refused[0].detail}")
    return [each for each in entered if isinstance(each, Case)]


def agreement(results: Sequence[RateResult | CoreError], answers: Sequence[Answer]) -> str:
    """Largest differences of the two answers over some cases."""
    found = [Answer.of(result) for result in results if isinstance(result, RateResult)]
    if len(found) != len(answers):
        raise ValueError(f"{len(answers) - len(found)} of the cases were not rated")
    pairs = list(zip(found, answers, strict=True))
    parts = [
        f"duty {max(abs(f.duty / a.duty - 1.0) for f, a in pairs):.2%}",
        f"outlet {max(abs(f.outlet - a.outlet) for f, a in pairs):.3f} K",
        f"outside drop {max(abs(f.outside_drop / a.outside_drop - 1.0) for f, a in pairs):.1%}",
    ]
    inner = [abs(f.inside_drop / a.inside_drop - 1.0) for f, a in pairs if f.inside_drop and a.inside_drop]
    if inner:
        parts.append(f"inside drop {max(inner):.1%}")
    return ", ".join(parts)


def say_taken(way: str, what: str, seconds: float, march: float) -> None:
    """Print one time a case and how many times the march's goes into it."""
    say(f"  {way:<20}{what:<8}{seconds * 1e6:10.1f} us a case    march / {what:<7}{march / seconds:8.2f}")


def single(body: dict[str, Any], methods: dict[str, str], repeats: int) -> None:
    """Time one case by the march and by ``rate``."""
    march = best(lambda: March(body).answer(), repeats, 3)
    say(f"  single case: scalar march {march * 1e6:.0f} us")
    for way, chosen in settings(methods).items():
        say_taken(way, "rate", best(partial(rate, requests_of([body], chosen)), repeats, 5), march)
    rated = rate(requests_of([body], {"methods": methods}))
    say(f"  largest difference, 1 case: {agreement(rated, [March(body).answer()])}")


def array(body: dict[str, Any], methods: dict[str, str], count: int, repeats: int) -> None:
    """Time many cases by the engine and by ``rate``, and a sample of them by the march."""
    bodies = variants(body, count)
    sample = bodies[:SAMPLE]
    march = best(lambda: [March(each).answer() for each in sample], repeats) / len(sample)
    say(
        f"  array of {count} different cases: scalar march {march * 1e6:.0f} us a case ({len(sample)} of them)"
    )
    for way, chosen in settings(methods).items():
        requests = requests_of(bodies, chosen)
        cases = cases_of(requests)
        say_taken(way, "door", best(partial(cases_of, requests), repeats) / count, march)
        say_taken(way, "engine", best(partial(_engine.perform, cases), repeats) / count, march)
        say_taken(way, "rate", best(partial(rate, requests), repeats) / count, march)
    rated = rate(requests_of(sample, {"methods": methods}))
    answers = [March(each).answer() for each in sample]
    say(f"  largest difference, {len(sample)} cases: {agreement(rated, answers)}")


def main(arguments: Sequence[str] | None = None) -> int:
    """Run the benchmark and print what was measured."""
    parser = argparse.ArgumentParser(description="Times ratings against a scalar march through the rows.")
    parser.add_argument("--cases", type=int, default=10_000, help="different cases in the array")
    parser.add_argument("--repeats", type=int, default=5, help="repeats, of which the least time counts")
    given = parser.parse_args(arguments)
    for name, methods in METHODS.items():
        body = json.loads((EXAMPLES / f"{name}.json").read_text(encoding="utf-8"))
        say(f"{name}: {body['label']}, {body['bank']['layout']['rows']} rows")
        rate(requests_of([body], {}))  # tables of properties are built at first use
        single(body, methods, given.repeats)
        array(body, methods, given.cases, given.repeats)
        say()
    return 0


if __name__ == "__main__":
    sys.exit(main())
