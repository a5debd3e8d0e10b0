"""Resistances in series from the inside stream to the outside stream, per outer surface of the bank."""

from collections.abc import Callable
from dataclasses import dataclass, fields

import numpy as np

from crossbank_service.rating._arrays import Array, Cases
from crossbank_service.rating._section import Section


@dataclass(frozen=True)
class Resistances(Cases):
    """Resistances of every cell on the outside area [m2 K/W]; (N, rows, segments) or broadcastable.

    ``film`` is that of the outside film alone, ``outside`` and ``outside_fouling`` count the surface efficiency.
    """

    outside: Array
    outside_fouling: Array
    fin_bond: Array
    wall: Array
    inside_fouling: Array
    inside: Array
    film: Array
    fin_efficiency: Array
    surface_efficiency: Array

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
    """Temperatures through the wall of every cell [K].

    From the inside outwards: the face the inside stream touches, the metal's inner surface, the tube's outer
    surface, the root of the fins beyond their bond, the mean of the fins, the mean surface the outside stream touches.
    """

    inside_film: Array
    inner_metal: Array
    outer_metal: Array
    fin_root: Array
    fin_mean: Array
    outside_film: Array

    @classmethod
    def at(cls, temperature: Array) -> "Faces":
        """All at one temperature."""
        return cls(*([temperature] * 6))


@dataclass(frozen=True)
class Wall(Cases):
    """The wall of every row per outside area: (N, rows, 1).

    ``area`` [m2] is that of a row, ``inside_ratio`` and ``bare_ratio`` the outside area over bore and bare tube,
    ``bond`` the bond resistance on the bare tube [m2 K/W], ``thickness_factor`` d/2 ln(d/d_i) [m],
    ``prime_share`` what the fins leave of the outside area.
    """

    area: Array
    inside_ratio: Array
    bare_ratio: Array
    bond: Array
    thickness_factor: Array
    prime_share: Array

    @classmethod
    def of(cls, sections: tuple[Section, ...]) -> "Wall":
        """Collect the walls of all rows."""

        def rows(values: Callable[[Section], Array]) -> Array:
            return np.concatenate(
                [np.repeat(values(s)[:, None], s.last - s.first, axis=1) for s in sections], axis=1
            )[:, :, None]

        def factor(section: Section) -> Array:
            d = section.bank.outer_diameter
            return np.asarray(0.5 * d * np.log(d / section.bank.bore))

        return cls(
            area=rows(lambda s: s.bank.outside_area / s.bank.covered_rows),
            inside_ratio=rows(lambda s: s.bank.outside_area / s.bank.inside_area),
            bare_ratio=rows(lambda s: s.bank.outside_area / s.bank.bare_area),
            bond=rows(lambda s: s.bond),
            thickness_factor=rows(factor),
            prime_share=rows(lambda s: 1.0 - s.bank.surface.fin_area_share),
        )

    def take_rows(self, row: int) -> "Wall":
        """The wall of one row, as a bank of one row."""
        return Wall(*(getattr(self, f.name)[:, row : row + 1] for f in fields(self)))


def conductivity(sections: tuple[Section, ...], temperature: Array) -> Array:
    """Conductivity of the tube metal at wall temperatures (N, rows, ...) [W/(m K)]."""
    return np.concatenate([s.metal(temperature[:, s.rows]) for s in sections], axis=1)


def in_series(
    sections: tuple[Section, ...],
    wall: Wall,
    film: Array,
    fouling: Array,
    walls: Faces,
    inside: tuple[Array, Array] | None,
) -> Resistances:
    """Resistances of the cells in series.

    Parameters
    ----------
    film : Array (N, rows, segments)
        Outside film coefficient [W/(m2 K)].
    fouling : Array (N, 1, 1)
        On the outside [m2 K/W].
    walls : Faces
        Last known temperatures.
    inside : (Array, Array) or None
        Inside film coefficient and fouling resistance on the bore; None where the tube surface is held.
    """
    resistance = 1.0 / film
    both = 1.0 / (resistance + fouling)
    fin, surface = np.empty_like(film), np.empty_like(film)
    for s in sections:
        fin[:, s.rows], surface[:, s.rows] = s.efficiencies(both[:, s.rows], walls.fin_mean[:, s.rows])
    nothing = np.zeros_like(wall.bond)
    metal = inner = scale = nothing
    if inside is not None:
        middle = 0.5 * (walls.inner_metal + walls.outer_metal)
        metal = wall.bare_ratio * wall.thickness_factor / conductivity(sections, middle)
        inner = wall.inside_ratio / inside[0]
        scale = wall.inside_ratio * inside[1]
    return Resistances(
        outside=resistance / surface,
        outside_fouling=fouling / surface,
        fin_bond=wall.bare_ratio * wall.bond,
        wall=metal,
        inside_fouling=scale,
        inside=inner,
        film=resistance,
        fin_efficiency=fin,
        surface_efficiency=surface,
    )


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
    outer_metal = inner_metal - flux * resistances.wall
    root = outer_metal - flux * resistances.fin_bond
    stream = root - flux * (resistances.outside + resistances.outside_fouling)
    return Faces(
        inside_film=inside_film,
        inner_metal=inner_metal,
        outer_metal=outer_metal,
        fin_root=root,
        fin_mean=stream + resistances.fin_efficiency * (root - stream),
        outside_film=stream + flux * resistances.film,
    )
