"""What the finned-tube methods share: ratios of the fins, the wall factor, names of inputs."""

import numpy as np

from crossbank_service.methods._blend import elementwise
from crossbank_service.methods.fin_surfaces import annular_area_ratio, fin_gap, free_width, plate_areas
from crossbank_service.methods.record import Array

# Heights and thicknesses below this are no fins; the laws have powers of both and are held here.
LEAST_FIN_HEIGHT = 1e-6
LEAST_FIN_THICKNESS = 1e-6

FIN_INPUTS = ("diameter_m", "fin_height_m", "fin_thickness_m", "fin_pitch_m")
PITCHES = ("transverse_pitch_m", "longitudinal_pitch_m")
PLATE_INPUTS = ("diameter_m", "fin_thickness_m", "fin_pitch_m", *PITCHES)


def gap_over_height(fin_height_m: Array, fin_thickness_m: Array, fin_pitch_m: Array) -> Array:
    """Clear gap between fins over their height, s/h [-]."""
    gap = fin_gap(fin_pitch_m=fin_pitch_m, fin_thickness_m=fin_thickness_m)
    return gap / np.maximum(fin_height_m, LEAST_FIN_HEIGHT)


def wall_factor(prandtl: Array, prandtl_wall: Array | None, gas: Array | None) -> Array | float:
    """(Pr/Pr_w)^0.26 for liquids, 1 for gases and where no wall value is given."""
    if prandtl_wall is None:
        return 1.0
    factor = (prandtl / prandtl_wall) ** 0.26
    return factor if gas is None else np.where(gas > 0.5, 1.0, factor)


@elementwise
def fin_area_ratio(
    *, diameter_m: Array, fin_height_m: Array, fin_thickness_m: Array, fin_pitch_m: Array, **_others: Array
) -> Array:
    """A/A_bare of annular fins from a method's inputs."""
    return annular_area_ratio(
        diameter_m=diameter_m,
        fin_height_m=fin_height_m,
        fin_thickness_m=fin_thickness_m,
        fin_pitch_m=fin_pitch_m,
    )


@elementwise
def tip_over_root(*, fin_height_m: Array, diameter_m: Array | None = None, **_others: Array) -> Array:
    """Diameter over the fins over that at their root; not a number, so not judged, without a diameter."""
    if diameter_m is None:
        return np.full(fin_height_m.shape, np.nan)
    return 1.0 + 2.0 * fin_height_m / diameter_m


@elementwise
def longitudinal_ratio(*, longitudinal_pitch_m: Array, diameter_m: Array, **_others: Array) -> Array:
    """Longitudinal pitch over root diameter."""
    return longitudinal_pitch_m / diameter_m


def plate_cell(
    *,
    arrangement: Array | float,
    rows: Array,
    diameter: Array,
    thickness: Array,
    pitch: Array,
    transverse: Array,
    longitudinal: Array,
) -> tuple[Array, Array, Array]:
    """Fin surface, collar surface and narrowest section of one tube, per metre of it [m2/m]."""
    fin, collar = plate_areas(
        diameter_m=diameter,
        fin_thickness_m=thickness,
        fin_pitch_m=pitch,
        transverse_pitch_m=transverse,
        longitudinal_pitch_m=longitudinal,
        rows=rows,
    )
    width = free_width(
        arrangement=arrangement,
        transverse_pitch_m=transverse,
        longitudinal_pitch_m=longitudinal,
        blocked_width_m=diameter,
        rows=rows,
    )
    return fin, collar, width * fin_gap(fin_pitch_m=pitch, fin_thickness_m=thickness) / pitch
