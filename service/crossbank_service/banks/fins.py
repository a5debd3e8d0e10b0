"""Finned tubes per metre of tube: areas, free width, metal of the fins.

A ``Surface`` describes N outside surfaces at once, plain or finned; multiplied by the length of all tubes
it gives the bank's areas and masses. Areas are m2 per metre of tube, so their unit is the metre.
"""

from dataclasses import dataclass, fields
from functools import cached_property
from typing import Protocol

import numpy as np
from numpy.typing import NDArray

from crossbank_service.methods.fin_surfaces import (
    annular_fin_area,
    blocked_width,
    diagonal_pitch,
    fin_gap,
    free_width,
    plate_areas,
    prime_area,
    serrated_fin_area,
)

Array = NDArray[np.float64]
Index = NDArray[np.intp]


class TubeLayout(Protocol):
    """Where the tubes of N banks stand: a ``TubeBank``, or a ``Layout`` where no bank is at hand."""

    @property
    def staggered(self) -> Array:
        """1.0 for staggered, 0.0 for in-line."""

    @property
    def transverse_pitch(self) -> Array:
        """Tube pitch across the stream [m]."""

    @property
    def longitudinal_pitch(self) -> Array:
        """Tube pitch along the stream [m]."""

    @property
    def rows(self) -> Array:
        """Rows along the stream."""


@dataclass(frozen=True, kw_only=True)
class Layout:
    """The least a surface needs to know of its bank; every array has shape (N,).

    Attributes
    ----------
    staggered : Array
        1.0 for staggered, 0.0 for in-line.
    transverse_pitch, longitudinal_pitch : Array
        Tube pitches [m].
    rows : Array
        Rows along the stream.
    """

    staggered: Array
    transverse_pitch: Array
    longitudinal_pitch: Array
    rows: Array


@dataclass(frozen=True)
class Surface:
    """N outside surfaces, each per metre of tube; every array has shape (N,).

    Attributes
    ----------
    root_diameter : Array
        Diameter the methods refer to: tube, fin root or collar [m].
    envelope_diameter : Array
        Over the fins; for plates that of the collar, their fins end nowhere [m].
    prime_area, fin_area : Array
        Surface between the fins and surface of the fins, tip edges included [m2/m].
    bare_area : Array
        Surface of the tube without fins, on which the bond resistance counts [m2/m].
    fin_gap : Array
        Clear gap between fins [m]; 0 where there are none.
    blocked_width : Array
        What a tube blocks of the stream's width, averaged along it [m].
    transverse_gap, diagonal_gap : Array
        Free width of one transverse pitch: between tubes of a row, and both diagonal gaps (of a staggered
        layout, whether or not the bank is one) [m].
    free_width : Array
        The one that governs [m].
    free_share : Array
        Free width over transverse pitch, sigma of an endless row [-].
    hydraulic_diameter : Array
        4 x free width x longitudinal pitch over the surface [m].
    fin_volume : Array
        Metal of the fins, of plates with their collars [m3/m].
    """

    root_diameter: Array
    envelope_diameter: Array
    prime_area: Array
    fin_area: Array
    bare_area: Array
    fin_gap: Array
    blocked_width: Array
    transverse_gap: Array
    diagonal_gap: Array
    free_width: Array
    free_share: Array
    hydraulic_diameter: Array
    fin_volume: Array

    def take(self, index: Index) -> "Surface":
        """Return a selection of the surfaces."""
        return Surface(*(getattr(self, f.name)[index] for f in fields(self)))

    @cached_property
    def area(self) -> Array:
        """Whole outside surface [m2/m]."""
        return self.prime_area + self.fin_area

    @cached_property
    def area_ratio(self) -> Array:
        """Whole outside surface over that of the bare tube [-]."""
        return self.area / self.bare_area

    @cached_property
    def fin_area_share(self) -> Array:
        """Fin surface over the whole [-]."""
        return self.fin_area / self.area

    def fin_mass(self, density: Array) -> Array:
        """Mass of the fins [kg/m].

        Parameters
        ----------
        density : Array
            Of the fin metal [kg/m3].

        Returns
        -------
        Array
            Volume times density.
        """
        return self.fin_volume * density


def neighbour_distance(layout: TubeLayout) -> Array:
    """Distance between nearest tubes of successive staggered rows [m]."""
    return diagonal_pitch(
        transverse_pitch_m=layout.transverse_pitch, longitudinal_pitch_m=layout.longitudinal_pitch
    )


def _widths(
    layout: TubeLayout, blocked: Array, open_share: Array | float = 1.0
) -> tuple[Array, Array, Array]:
    """Transverse gap, both diagonal gaps, and the governing width of one pitch [m]."""
    width = free_width(
        arrangement=layout.staggered,
        transverse_pitch_m=layout.transverse_pitch,
        longitudinal_pitch_m=layout.longitudinal_pitch,
        blocked_width_m=blocked,
        rows=layout.rows,
    )
    across = layout.transverse_pitch - blocked
    diagonal = 2.0 * (neighbour_distance(layout) - blocked)
    return across * open_share, diagonal * open_share, width * open_share


def _surface(
    *,
    layout: TubeLayout,
    root: Array,
    envelope: Array,
    prime: Array,
    fin: Array,
    gap: Array,
    blocked: Array,
    volume: Array,
    bare_diameter: Array,
    open_share: Array | float = 1.0,
) -> Surface:
    across, diagonal, width = _widths(layout, blocked, open_share)
    return Surface(
        root_diameter=root,
        envelope_diameter=envelope,
        prime_area=prime,
        fin_area=fin,
        bare_area=np.pi * bare_diameter,
        fin_gap=gap,
        blocked_width=layout.transverse_pitch - across,
        transverse_gap=across,
        diagonal_gap=diagonal,
        free_width=width,
        free_share=width / layout.transverse_pitch,
        hydraulic_diameter=4.0 * width * layout.longitudinal_pitch / (prime + fin),
        fin_volume=volume,
    )


def plain(*, layout: TubeLayout, outer_diameter: Array) -> Surface:
    """Describe plain tubes.

    Parameters
    ----------
    layout : TubeLayout
        Where the tubes stand.
    outer_diameter : Array
        Tube diameter [m].

    Returns
    -------
    Surface
        Without fins.
    """
    none = np.zeros_like(outer_diameter)
    return _surface(
        layout=layout,
        root=outer_diameter,
        envelope=outer_diameter,
        prime=np.pi * outer_diameter,
        fin=none,
        gap=none,
        blocked=outer_diameter,
        volume=none,
        bare_diameter=outer_diameter,
    )


def annular(
    *, layout: TubeLayout, outer_diameter: Array, fin_height: Array, fin_thickness: Array, fin_pitch: Array
) -> Surface:
    """Describe tubes with annular fins of uniform thickness.

    Parameters
    ----------
    layout : TubeLayout
        Where the tubes stand.
    outer_diameter : Array
        Tube diameter at the root of the fins [m].
    fin_height, fin_thickness, fin_pitch : Array
        Tube to tip; thickness; centre to centre [m].

    Returns
    -------
    Surface
        At height 0 the plain tube's areas and widths.
    """
    return _surface(
        layout=layout,
        root=outer_diameter,
        envelope=outer_diameter + 2.0 * fin_height,
        prime=prime_area(diameter_m=outer_diameter, fin_thickness_m=fin_thickness, fin_pitch_m=fin_pitch),
        fin=annular_fin_area(
            diameter_m=outer_diameter,
            fin_height_m=fin_height,
            fin_thickness_m=fin_thickness,
            fin_pitch_m=fin_pitch,
        ),
        gap=fin_gap(fin_pitch_m=fin_pitch, fin_thickness_m=fin_thickness),
        blocked=blocked_width(
            diameter_m=outer_diameter,
            fin_height_m=fin_height,
            fin_thickness_m=fin_thickness,
            fin_pitch_m=fin_pitch,
        ),
        volume=np.pi * fin_height * (outer_diameter + fin_height) * fin_thickness / fin_pitch,
        bare_diameter=outer_diameter,
    )


def serrated(
    *,
    layout: TubeLayout,
    outer_diameter: Array,
    fin_height: Array,
    fin_thickness: Array,
    fin_pitch: Array,
    segment_width: Array,
    cut_depth: Array,
) -> Surface:
    """Describe tubes with serrated fins: strips of constant width on an uncut ring.

    Parameters
    ----------
    layout : TubeLayout
        Where the tubes stand.
    outer_diameter : Array
        Tube diameter at the root of the fins [m].
    fin_height, fin_thickness, fin_pitch : Array
        Tube to tip; thickness; centre to centre [m].
    segment_width, cut_depth : Array
        Width of a segment; depth of the cuts from the tip [m].

    Returns
    -------
    Surface
        The stream's free width is counted as for uncut fins.
    """
    ring = fin_height - cut_depth
    strips = np.pi * (outer_diameter + 2.0 * ring) * cut_depth
    return _surface(
        layout=layout,
        root=outer_diameter,
        envelope=outer_diameter + 2.0 * fin_height,
        prime=prime_area(diameter_m=outer_diameter, fin_thickness_m=fin_thickness, fin_pitch_m=fin_pitch),
        fin=serrated_fin_area(
            diameter_m=outer_diameter,
            fin_height_m=fin_height,
            fin_thickness_m=fin_thickness,
            fin_pitch_m=fin_pitch,
            segment_width_m=segment_width,
            cut_depth_m=cut_depth,
        ),
        gap=fin_gap(fin_pitch_m=fin_pitch, fin_thickness_m=fin_thickness),
        blocked=blocked_width(
            diameter_m=outer_diameter,
            fin_height_m=fin_height,
            fin_thickness_m=fin_thickness,
            fin_pitch_m=fin_pitch,
        ),
        volume=(np.pi * ring * (outer_diameter + ring) + strips) * fin_thickness / fin_pitch,
        bare_diameter=outer_diameter,
    )


def plate(*, layout: TubeLayout, outer_diameter: Array, fin_thickness: Array, fin_pitch: Array) -> Surface:
    """Describe tubes through continuous flat plates with full collars.

    Parameters
    ----------
    layout : TubeLayout
        Where the tubes stand; a plate is rows x longitudinal pitch deep.
    outer_diameter : Array
        Tube diameter inside the collars [m].
    fin_thickness, fin_pitch : Array
        Plate thickness; centre to centre [m].

    Returns
    -------
    Surface
        The root diameter is the collar's, outer diameter + 2 thickness; the bare area that of the tube.
    """
    collar = outer_diameter + 2.0 * fin_thickness
    fin, prime = plate_areas(
        diameter_m=collar,
        fin_thickness_m=fin_thickness,
        fin_pitch_m=fin_pitch,
        transverse_pitch_m=layout.transverse_pitch,
        longitudinal_pitch_m=layout.longitudinal_pitch,
        rows=layout.rows,
    )
    gap = fin_gap(fin_pitch_m=fin_pitch, fin_thickness_m=fin_thickness)
    cell = np.maximum(layout.transverse_pitch * layout.longitudinal_pitch - 0.25 * np.pi * collar**2, 0.0)
    collars = np.pi * (outer_diameter + fin_thickness) * fin_thickness
    return _surface(
        layout=layout,
        root=collar,
        envelope=collar,
        prime=prime,
        fin=fin,
        gap=gap,
        blocked=collar,
        volume=cell * fin_thickness / fin_pitch + collars,
        bare_diameter=outer_diameter,
        open_share=gap / fin_pitch,
    )
