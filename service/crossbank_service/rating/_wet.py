"""Vapour that condenses on a cold surface: sensible and latent heat of every cell, and the humidity it leaves.

Where a surface lies below the dew point, vapour reaches it by diffusion and gives off its latent heat there. With
q_s the sensible heat of a cell and m its condensate, the total is q = xi q_s, xi = 1 + m lambda/q_s. So a wet cell is
a dry one whose film coefficient is xi times larger (through fouling, fins and wall) and whose stream, which still
cools by q_s alone, has xi times its capacity rate: the heat balance of the grid keeps its form. A fin's efficiency
then sees the film xi h, which is Threlkeld's wet fin with the secant in place of the slope of the saturation line.
In a dry cell xi is 1 exactly.

Mass transfer: m" = h/(c_p Le^(2/3)) (W - W_s(T)), c_p per kg of dry gas; above some 5 % of vapour the driving force is
M_w/M_dry ln[(p - p_s)/(p - p_w)]. Le = alpha/D, D of steam in air after Marrero & Mason (1972).
"""

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from crossbank_service.methods.inside_condensing import steam_air_diffusivity
from crossbank_service.properties import psychrometrics
from crossbank_service.rating._arrays import Array, Cases, spread
from crossbank_service.rating._network import Field, relaxation
from crossbank_service.rating._outside import OutsideStream
from crossbank_service.rating._wall import Faces, Resistances

FREEZING_K = 273.15
ROOT_STEPS = 24
DILUTE, RICH = 0.03, 0.07
"""Vapour mole fractions between which the driving force passes from one form to the other."""


@dataclass(frozen=True)
class Moisture(Cases):
    """The vapour of N outside streams, (N,): dry flow [kg/s], inlet humidity ratio, M_w/M_dry."""

    dry_flow: Array
    humidity: Array
    molar_ratio: Array


@dataclass(frozen=True)
class Wetness(Cases):
    """Moisture in every cell, (N, rows, segments).

    ``film_factor`` and ``capacity_factor`` multiply the film coefficient and the capacity rate; ``entering`` and
    ``leaving`` are humidity ratios, ``condensed`` and ``fog`` [kg/s] settle on the surface and stay in the stream,
    ``latent`` [W] is given off by the former; ``frost`` is 1.0 where a wet surface would freeze.
    """

    film_factor: Array
    capacity_factor: Array
    entering: Array
    leaving: Array
    condensed: Array
    fog: Array
    latent: Array
    surface: Array
    frost: Array


def dry(moisture: Moisture, like: Array) -> Wetness:
    """All cells dry."""
    humidity = np.broadcast_to(spread(moisture.humidity, like), like.shape)
    nothing = (np.zeros_like(like) for _ in range(5))
    return Wetness(np.ones_like(like), np.ones_like(like), humidity.copy(), humidity.copy(), *nothing)


def capacity_outside(moisture: Moisture, wetness: Wetness, field: Field, inlet_capacity: Array) -> Array:
    """Capacity rate of the stream through each cell with the vapour it still has, times the wet cell's factor.

    Parameters
    ----------
    inlet_capacity : Array (N, rows, segments)
        With all the vapour of the inlet [W/K].
    """
    middle = 0.5 * (field.outside_in + field.outside_out)
    per_segment = spread(moisture.dry_flow, middle) / middle.shape[2]
    lost = spread(moisture.humidity, middle) - wetness.entering
    without = inlet_capacity - per_segment * lost * psychrometrics.vapour_heat_capacity(middle)
    return np.asarray(without * wetness.capacity_factor)


def renew(
    moisture: Moisture,
    stream: OutsideStream,
    field: Field,
    walls: Faces,
    resistances: Resistances,
    film: Array,
    prime_share: Array,
    area: Array,
    capacity: Array,
    pressure: Array,
) -> Wetness:
    """Moisture of every cell at the temperatures of the last heat balance.

    Parameters
    ----------
    resistances : Resistances
        Those of the balance that gave ``field``; their ``film`` counts its film factor.
    film : Array
        Dry film coefficient [W/(m2 K)].
    prime_share : Array (N, rows, 1)
        Tube surface between the fins over the whole.
    area : Array
        Outside surface of a cell [m2].
    capacity : Array
        Capacity rate of the stream through each cell with the vapour it has, without the wet factor [W/K].
    pressure : Array (N, rows, 1)
        [Pa]
    """
    flux = field.heat / area
    gas = walls.outside_film - flux * resistances.film
    inner = resistances.fin_bond + resistances.wall + resistances.inside_fouling + resistances.inside
    inside = gas + flux * resistances.total
    # what the film leaves between stream and face, of what film and fouling leave between stream and metal
    outer = resistances.film / (
        resistances.film + resistances.outside_fouling * resistances.surface_efficiency
    )
    state = stream.medium.at(gas, pressure)
    diffusivity = steam_air_diffusivity(temperature_k=gas, pressure_pa=pressure)
    lewis = state.conductivity_w_m_k / (state.density_kg_m3 * state.heat_capacity_j_kg_k * diffusivity)
    per_dry = state.heat_capacity_j_kg_k * (1.0 + spread(moisture.humidity, gas))
    transfer = film / (per_dry * lewis ** (2.0 / 3.0))
    dry_flow = spread(moisture.dry_flow, gas)[:, 0] / gas.shape[2]
    ratio = spread(moisture.molar_ratio, gas)[:, 0]

    out = dry(moisture, gas)
    humidity = out.leaving[:, 0].copy()
    for r in range(gas.shape[1]):
        cell = _Cell(
            gas=gas[:, r],
            inside=inside[:, r],
            inner=np.broadcast_to(inner, gas.shape)[:, r],
            film=film[:, r],
            transfer=transfer[:, r],
            prime_reach=np.broadcast_to(outer, gas.shape)[:, r],
            fin_reach=(outer * resistances.fin_efficiency)[:, r],
            prime_share=np.broadcast_to(prime_share[:, r], humidity.shape),
            leaving=field.outside_out[:, r],
            humidity=humidity,
            units=area[:, r] * transfer[:, r] / dry_flow,
            pressure=np.broadcast_to(pressure[:, r], humidity.shape),
            ratio=ratio,
        )
        root = cell.root()
        drive, at, iced = cell.drive(root)
        q_s = area[:, r] * cell.sensible(root)
        mass = np.minimum(area[:, r] * cell.transfer * drive, 0.999 * dry_flow * humidity)
        wet = (mass > 0.0) & (q_s > 0.0)
        mass = np.where(wet, mass, 0.0)
        first = field.outside_in[:, r]
        clear = np.where(wet, first - q_s / capacity[:, r], field.outside_out[:, r])
        after = humidity - mass / dry_flow
        per_kg = psychrometrics.vapour_enthalpy(cell.leaving) - psychrometrics.condensate_enthalpy(at)
        gain = dry_flow * per_kg / capacity[:, r]
        last, settled = _fog(after, clear, gain, cell.pressure, ratio, wet)
        given = np.where(wet, mass * per_kg, 0.0)
        total = q_s + given
        cooling = np.maximum(capacity[:, r] * (first - last), 1e-6 * np.maximum(total, 1e-300))
        out.film_factor[:, r] = np.where(wet, total / np.where(wet, q_s, 1.0), 1.0)
        out.capacity_factor[:, r] = np.where(wet, total / np.where(wet, cooling, 1.0), 1.0)
        out.condensed[:, r] = mass
        out.fog[:, r] = np.where(wet, dry_flow * (after - settled), 0.0)
        out.latent[:, r], out.surface[:, r], out.frost[:, r] = given, at, iced
        out.entering[:, r] = humidity
        humidity = settled
        out.leaving[:, r] = humidity
    return out


@dataclass(frozen=True)
class _Cell:
    """The cells of one row, (N, segments): what their surface temperature hangs on.

    Temperatures of stream and inside [K], ``leaving`` that at which the stream parts with its vapour, ``inner``
    resistance between inside and fin root [m2 K/W], dry film [W/(m2 K)], mass transfer coefficient [kg/(m2 s)];
    ``prime_reach`` and ``fin_reach`` are the differences between stream and faces over that between stream and root.
    """

    gas: Array
    inside: Array
    inner: Array
    film: Array
    transfer: Array
    prime_reach: Array
    fin_reach: Array
    prime_share: Array
    leaving: Array
    humidity: Array
    units: Array
    pressure: Array
    ratio: Array

    def sensible(self, root: Array) -> Array:
        """Sensible heat to the surface [W/m2]."""
        reach = self.prime_share * self.prime_reach + (1.0 - self.prime_share) * self.fin_reach
        return self.film * reach * (self.gas - root)

    def drive(self, root: Array) -> tuple[Array, Array, Array]:
        """Driving force over the whole surface, mean temperature of the wet part [K], and where frost would grow.

        The stream dries on its way through the cell: over ``units`` transfer units of wet surface the mean driving
        force is (1 - exp(-N))/N of that at the inlet.
        """
        drive, cold, iced = np.zeros_like(root), np.zeros_like(root), np.zeros_like(root)
        square = np.zeros_like(root)
        parts = (self.prime_share, self.prime_reach), (1.0 - self.prime_share, self.fin_reach)
        for share, reach in parts:
            face = self.gas - reach * (self.gas - root)
            here = share * _drive(self.humidity, face, self.pressure, self.ratio)
            frozen = (here > 0.0) & (face < FREEZING_K)
            iced = np.where(frozen, 1.0, iced)
            here = np.where(frozen, 0.0, here)
            drive, cold = drive + here, cold + here * face
            square = square + here * here / np.maximum(share, 1e-12)
        # the share of the surface that counts as wet grows from nothing as a part of it comes below the dew point
        wet = drive * drive / np.where(square > 0.0, square, 1.0)
        drive, cold = (each * relaxation(wet * self.units) for each in (drive, cold))
        return drive, np.where(drive > 0.0, cold / np.where(drive > 0.0, drive, 1.0), root), iced

    def _excess(self, root: Array) -> Array:
        """Heat that reaches the root less what the inside takes from it [W/m2], times the inner resistance [K]."""
        drive, at, _ = self.drive(root)
        heat = psychrometrics.vapour_enthalpy(self.leaving) - psychrometrics.condensate_enthalpy(at)
        return self.inner * (self.sensible(root) + self.transfer * drive * heat) - (root - self.inside)

    def root(self) -> Array:
        """Temperature of the fin root where the heats agree, between inside and stream: regula falsi, Illinois rule."""
        low, high = np.minimum(self.inside, self.gas), np.maximum(self.inside, self.gas)
        at_low, at_high = self._excess(low), self._excess(high)
        guess = low
        side = np.zeros_like(low)
        for _ in range(ROOT_STEPS):
            width = at_low - at_high
            safe = np.where(width > 0.0, width, 1.0)
            guess = np.clip(np.where(width > 0.0, low + (high - low) * at_low / safe, low), low, high)
            value = self._excess(guess)
            above = value > 0.0
            low, high = np.where(above, guess, low), np.where(above, high, guess)
            # an end that stays a second time counts half, so that it does not stick
            at_low = np.where(above, value, np.where(side < 0.0, 0.5 * at_low, at_low))
            at_high = np.where(above, np.where(side > 0.0, 0.5 * at_high, at_high), value)
            side = np.where(above, 1.0, -1.0)
        return guess


def _drive(humidity: Array, face: Array, pressure: Array, ratio: Array) -> Array:
    """Driving force of condensation at a face, a difference of humidity ratios; 0 where the face is dry."""
    vapour = pressure * humidity / (ratio + humidity)
    saturated = psychrometrics.saturation_pressure(face)
    cold = saturated < vapour
    at_face = np.minimum(saturated, vapour)
    difference = humidity - ratio * at_face / (pressure - at_face)
    log = ratio * np.log((pressure - at_face) / (pressure - vapour))
    rich = np.clip((vapour / pressure - DILUTE) / (RICH - DILUTE), 0.0, 1.0)
    rich = rich * rich * (3.0 - 2.0 * rich)
    return np.where(cold, (1.0 - rich) * difference + rich * log, 0.0)


def _saturated(temperature: Array, pressure: Array, ratio: Array) -> Array:
    vapour = np.minimum(psychrometrics.saturation_pressure(temperature), 0.9 * pressure)
    return np.asarray(ratio * vapour / (pressure - vapour))


def _fog(
    humidity: Array,
    temperature: Array,
    gain: Array,
    pressure: Array,
    ratio: Array,
    wet: NDArray[np.bool_],
) -> tuple[Array, Array]:
    """Temperature and humidity after vapour beyond saturation has turned to fog at constant enthalpy.

    ``gain`` is the rise of the stream for each unit of humidity ratio that turns to fog [K].
    """
    over = wet & (humidity > _saturated(temperature, pressure, ratio))
    if not over.any():
        return temperature, humidity
    t = temperature
    for _ in range(12):
        saturated = _saturated(t, pressure, ratio)
        slope = (_saturated(t + 0.01, pressure, ratio) - saturated) / 0.01
        t = t - (t - temperature - gain * (humidity - saturated)) / (1.0 + gain * slope)
    t = np.where(over, t, temperature)
    return t, np.where(over, np.minimum(humidity, _saturated(t, pressure, ratio)), humidity)
