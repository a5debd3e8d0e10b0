"""Resistances in series from the inside stream to the outside stream, per outer surface of the bank."""

from dataclasses import dataclass

import numpy as np

from crossbank_service.banks import TubeBank
from crossbank_service.properties import Curve
from crossbank_service.rating._arrays import Array, Cases, spread


@dataclass(frozen=True)
class Resistances(Cases):
    """Resistances of every cell on the outside area [m2 K/W]; (N, rows, segments) or broadcastable."""

    outside: Array
    outside_fouling: Array
    fin_bond: Array
    wall: Array
    inside_fouling: Array
    inside: Array

    @property
    def total(self) -> Array:
        """All in series."""
        return (
            self.outside
            + self.outside_fouling
            + self.fin_bond
            + self.wall
            + self.inside_fouling
            + self.inside
        )

    @property
    def clean(self) -> Array:
        """Without the fouling layers."""
        return self.outside + self.fin_bond + self.wall + self.inside


@dataclass(frozen=True)
class Faces(Cases):
    """Temperatures through the wall of every cell [K]: fouling faces and metal surfaces."""

    inside_film: Array
    inner_metal: Array
    outer_metal: Array
    outside_film: Array


def wall_resistance(bank: TubeBank, metal: Curve, temperature: Array) -> Array:
    """Conduction through the tube wall on the outer surface [m2 K/W]."""
    d = spread(bank.outer_diameter, temperature)
    return d * np.log(d / spread(bank.bore, temperature)) / (2.0 * metal(temperature))


def faces(resistances: Resistances, inside_mean: Array, flux: Array) -> Faces:
    """Temperatures from the inside stream's mean outwards.

    Parameters
    ----------
    inside_mean : Array (N, rows, segments)
        Mean inside temperature of the cell [K] (the outer tube surface where that is held).
    flux : Array
        Heat per outside area, positive outwards [W/m2].
    """
    inside_film = inside_mean - flux * resistances.inside
    inner_metal = inside_film - flux * resistances.inside_fouling
    outer_metal = inner_metal - flux * (resistances.wall + resistances.fin_bond)
    return Faces(inside_film, inner_metal, outer_metal, outer_metal - flux * resistances.outside_fouling)
