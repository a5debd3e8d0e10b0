"""Areas, free-flow sections, volumes and masses of tube banks, N banks at once."""

from dataclasses import dataclass, fields, replace
from functools import cached_property
from typing import Literal

import numpy as np
from numpy.typing import NDArray

from crossbank_service.banks import fins
from crossbank_service.banks.fins import Surface

Array = NDArray[np.float64]
Index = NDArray[np.intp]
FinKind = Literal["annular", "serrated", "plate"]


@dataclass(frozen=True)
class FinSet:
    """Fins of one kind on N banks; every array has shape (N,), lengths in metres.

    Attributes
    ----------
    kind : str
        ``annular``, ``serrated`` or ``plate``.
    height, thickness, pitch, segment_width, cut_depth : Array
        As on the wire [m]; 0 where the kind has no such member.
    density : Array
        Of the fin metal [kg/m3]; 0 where it is unknown.
    """

    kind: FinKind
    height: Array
    thickness: Array
    pitch: Array
    segment_width: Array
    cut_depth: Array
    density: Array

    def take(self, index: Index | slice) -> "FinSet":
        """The fins of a selection of the banks."""
        arrays = (getattr(self, f.name)[index] for f in fields(self) if f.name != "kind")
        return FinSet(self.kind, *arrays)


@dataclass(frozen=True)
class TubeBank:
    """N banks of one kind of surface; every array has shape (N,), lengths in metres.

    Attributes
    ----------
    staggered : Array
        1.0 for staggered, 0.0 for in-line.
    transverse_pitch, longitudinal_pitch, outer_diameter, wall_thickness, tube_length : Array
        As on the wire [m].
    rows, tubes_per_row : Array
        Counts; ``rows`` is what the correlations count.
    side_gap : Array
        Clear distance from the outermost tube to the wall [m].
    roughness : Array
        Of the bore [m].
    tube_density : Array
        Of the tube metal [kg/m3]; 0 where it is unknown.
    covered_rows : Array
        Rows that have this surface: all, unless the bank has row groups.
    fins : FinSet or None
        None for plain tubes.
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
    covered_rows: Array
    fins: FinSet | None = None

    def take(self, index: Index | slice) -> "TubeBank":
        """A selection of the banks."""
        chosen = TubeBank(*(getattr(self, f.name)[index] for f in fields(self) if f.name != "fins"))
        return chosen if self.fins is None else replace(chosen, fins=self.fins.take(index))

    @cached_property
    def surface(self) -> Surface:
        """Outside surface per metre of tube."""
        match self.fins:
            case None:
                return fins.plain(layout=self, outer_diameter=self.outer_diameter)
            case FinSet(kind="annular") as own:
                return fins.annular(
                    layout=self,
                    outer_diameter=self.outer_diameter,
                    fin_height=own.height,
                    fin_thickness=own.thickness,
                    fin_pitch=own.pitch,
                )
            case FinSet(kind="serrated") as own:
                return fins.serrated(
                    layout=self,
                    outer_diameter=self.outer_diameter,
                    fin_height=own.height,
                    fin_thickness=own.thickness,
                    fin_pitch=own.pitch,
                    segment_width=own.segment_width,
                    cut_depth=own.cut_depth,
                )
            case own:
                return fins.plate(
                    layout=self,
                    outer_diameter=self.outer_diameter,
                    fin_thickness=own.thickness,
                    fin_pitch=own.pitch,
                )

    @cached_property
    def root_diameter(self) -> Array:
        """Diameter the correlations refer to: tube, fin root or collar [m]."""
        return self.surface.root_diameter

    @cached_property
    def a(self) -> Array:
        """Transverse pitch ratio."""
        return self.transverse_pitch / self.outer_diameter

    @cached_property
    def b(self) -> Array:
        """Longitudinal pitch ratio."""
        return self.longitudinal_pitch / self.outer_diameter

    @cached_property
    def bore(self) -> Array:
        """Inner diameter [m]."""
        return self.outer_diameter - 2.0 * self.wall_thickness

    @cached_property
    def width(self) -> Array:
        """Duct width across the tubes, side gaps measured from the fin tips [m]."""
        reach = (self.tubes_per_row - 1.0) * self.transverse_pitch + self.surface.envelope_diameter
        return reach + 2.0 * self.side_gap

    @cached_property
    def depth(self) -> Array:
        """Extent along the outside stream, over the fins [m]; plates reach half a pitch beyond the tubes."""
        if self.fins is not None and self.fins.kind == "plate":
            return self.rows * self.longitudinal_pitch
        return (self.rows - 1.0) * self.longitudinal_pitch + self.surface.envelope_diameter

    @cached_property
    def face_area(self) -> Array:
        """Section of the empty duct [m2]."""
        return self.width * self.tube_length

    @cached_property
    def diagonal_gap_governs(self) -> Array:
        """1.0 where the two diagonal gaps of a staggered pitch are narrower than the transverse gap."""
        narrower = self.surface.diagonal_gap < self.surface.transverse_gap
        return np.where((self.staggered > 0.5) & narrower & (self.rows > 1.0), 1.0, 0.0)

    @cached_property
    def free_area(self) -> Array:
        """Narrowest section of the outside stream [m2].

        The transverse gaps between all tubes of a row, or, where the diagonal gaps govern, those of each pitch;
        side gaps beyond half a gap between tubes (or fin tips) add what they have in excess.
        """
        clear = self.transverse_pitch - self.surface.envelope_diameter
        beyond_half_gap = 2.0 * self.side_gap - clear
        return (self.tubes_per_row * self.surface.free_width + beyond_half_gap) * self.tube_length

    @cached_property
    def sigma(self) -> Array:
        """Narrowest section over the empty duct."""
        return self.free_area / self.face_area

    @cached_property
    def tube_count(self) -> Array:
        """Tubes in the bank; a row shifted by half a pitch counts like the others (one less and two halves)."""
        return self.covered_rows * self.tubes_per_row

    @cached_property
    def tube_run(self) -> Array:
        """Length of all tubes with this surface in the duct [m]."""
        return self.covered_rows * self.tubes_per_row * self.tube_length

    @cached_property
    def outside_area(self) -> Array:
        """All outside surface in the duct, fins included [m2]."""
        return self.surface.area * self.tube_run

    @cached_property
    def bare_area(self) -> Array:
        """Outer surface of the tubes without fins [m2]."""
        return self.surface.bare_area * self.tube_run

    @cached_property
    def fin_area(self) -> Array:
        """Surface of the fins [m2]."""
        return self.surface.fin_area * self.tube_run

    @cached_property
    def inside_area(self) -> Array:
        """Bore surface in the duct [m2]."""
        return np.pi * self.bore * self.tube_run

    @cached_property
    def bore_section(self) -> Array:
        """Flow section of one tube [m2]."""
        return 0.25 * np.pi * self.bore**2

    @cached_property
    def inside_volume(self) -> Array:
        """Volume of the bores [m3]."""
        return self.bore_section * self.tube_run

    @cached_property
    def metal_mass(self) -> Array:
        """Mass of tubes and fins in the duct [kg]; 0 where a density is unknown."""
        ring = 0.25 * np.pi * (self.outer_diameter**2 - self.bore**2)
        tubes = ring * self.tube_run * self.tube_density
        if self.fins is None:
            return tubes
        own = self.surface.fin_mass(self.fins.density) * self.tube_run
        return np.where((self.tube_density > 0.0) & (self.fins.density > 0.0), tubes + own, 0.0)
