"""Areas, free-flow sections, volumes and masses of tube banks, N banks at once."""

from dataclasses import dataclass, fields

import numpy as np
from numpy.typing import NDArray

Array = NDArray[np.float64]
Index = NDArray[np.intp]


@dataclass(frozen=True)
class TubeBank:
    """N banks of plain tubes; every array has shape (N,), lengths in metres.

    Attributes
    ----------
    staggered : Array
        1.0 for staggered, 0.0 for in-line.
    transverse_pitch, longitudinal_pitch, outer_diameter, wall_thickness, tube_length : Array
        As on the wire [m].
    rows, tubes_per_row : Array
        Counts.
    side_gap : Array
        Clear distance from the outermost tube to the wall [m].
    roughness : Array
        Of the bore [m].
    tube_density : Array
        Of the tube metal [kg/m3]; 0 where it is unknown.
    """

    staggered: Array
    transverse_pitch: Array
    longitudinal_pitch: Array
    rows: Array
    tubes_per_row: Array
    tube_length: Array
    side_gap: Array
    outer_diameter: Array
    wall_thickness: Array
    roughness: Array
    tube_density: Array

    def take(self, index: Index) -> "TubeBank":
        """A selection of the banks."""
        return TubeBank(*(getattr(self, f.name)[index] for f in fields(self)))

    @property
    def a(self) -> Array:
        """Transverse pitch ratio."""
        return self.transverse_pitch / self.outer_diameter

    @property
    def b(self) -> Array:
        """Longitudinal pitch ratio."""
        return self.longitudinal_pitch / self.outer_diameter

    @property
    def bore(self) -> Array:
        """Inner diameter [m]."""
        return self.outer_diameter - 2.0 * self.wall_thickness

    @property
    def width(self) -> Array:
        """Duct width across the tubes [m]."""
        return (self.tubes_per_row - 1.0) * self.transverse_pitch + self.outer_diameter + 2.0 * self.side_gap

    @property
    def depth(self) -> Array:
        """Extent along the outside stream, tube surface to tube surface [m]."""
        return (self.rows - 1.0) * self.longitudinal_pitch + self.outer_diameter

    @property
    def face_area(self) -> Array:
        """Section of the empty duct [m2]."""
        return self.width * self.tube_length

    @property
    def diagonal_gap_governs(self) -> Array:
        """1.0 where the two diagonal gaps of a staggered pitch are narrower than the transverse gap."""
        diagonal = np.hypot(0.5 * self.transverse_pitch, self.longitudinal_pitch)
        narrower = 2.0 * (diagonal - self.outer_diameter) < self.transverse_pitch - self.outer_diameter
        return np.where((self.staggered > 0.5) & narrower & (self.rows > 1.0), 1.0, 0.0)

    @property
    def free_area(self) -> Array:
        """Narrowest section of the outside stream [m2].

        The transverse gaps between all tubes of a row, or, where the diagonal gaps govern, those of each pitch;
        side gaps beyond half a tube gap add what they have in excess.
        """
        d, st = self.outer_diameter, self.transverse_pitch
        diagonal = 2.0 * (np.hypot(0.5 * st, self.longitudinal_pitch) - d)
        per_pitch = np.where(self.diagonal_gap_governs > 0.5, diagonal, st - d)
        beyond_half_gap = 2.0 * self.side_gap - (st - d)
        return (self.tubes_per_row * per_pitch + beyond_half_gap) * self.tube_length

    @property
    def sigma(self) -> Array:
        """Narrowest section over the empty duct."""
        return self.free_area / self.face_area

    @property
    def tube_count(self) -> Array:
        """Tubes in the bank; a row shifted by half a pitch counts like the others (one less and two halves)."""
        return self.rows * self.tubes_per_row

    @property
    def outside_area(self) -> Array:
        """Outer tube surface in the duct [m2]."""
        return np.pi * self.outer_diameter * self.tube_length * self.tube_count

    @property
    def inside_area(self) -> Array:
        """Bore surface in the duct [m2]."""
        return np.pi * self.bore * self.tube_length * self.tube_count

    @property
    def bore_section(self) -> Array:
        """Flow section of one tube [m2]."""
        return 0.25 * np.pi * self.bore**2

    @property
    def inside_volume(self) -> Array:
        """Volume of the bores [m3]."""
        return self.bore_section * self.tube_length * self.tube_count

    @property
    def metal_mass(self) -> Array:
        """Mass of the tubes in the duct [kg]; 0 where the density is unknown."""
        ring = 0.25 * np.pi * (self.outer_diameter**2 - self.bore**2)
        return ring * self.tube_length * self.tube_count * self.tube_density
