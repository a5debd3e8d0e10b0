"""The bank: what belongs to the equipment."""

from typing import Annotated, Literal

from msgspec import Meta

from crossbank.contract._base import Request
from crossbank.contract._units import (
    DiameterM,
    GapM,
    LengthM,
    LossCoefficient,
    MetalConductivity,
    MetalDensity,
    Passes,
    PitchM,
    RoughnessM,
    Rows,
    TemperatureK,
    TubesPerRow,
    WallThicknessM,
    Word,
)

MaterialName = Annotated[
    str,
    Meta(
        min_length=1,
        max_length=80,
        description="A slug of `/v1/materials` or an alias.",
        extra={"names": "material"},
    ),
]


class Curve(Request, kw_only=True, frozen=True):
    """A property by temperature: linear between the points, constant beyond the ends."""

    temperature_k: Annotated[list[TemperatureK], Meta(min_length=1, max_length=200)]
    value: Annotated[list[MetalConductivity], Meta(min_length=1, max_length=200)]

    same_length = (("temperature_k", "value"),)


class Material(Request, kw_only=True, frozen=True):
    """A metal of the caller's own."""

    name: Word
    conductivity_w_m_k: MetalConductivity | Curve
    density_kg_m3: MetalDensity | None = None


class Layout(Request, kw_only=True, frozen=True):
    """Where the tubes stand in the duct.

    `tubes_per_row` counts row 1; `tube_length_m` is the length in the duct; `side_gap_m` is the clear
    distance from the outermost tube of row 1 to the wall (null: half the clear gap between tubes).
    """

    arrangement: Literal["inline", "staggered"]
    transverse_pitch_m: PitchM
    longitudinal_pitch_m: PitchM
    rows: Rows
    tubes_per_row: TubesPerRow
    tube_length_m: LengthM
    side_gap_m: GapM | None = None


class Tube(Request, kw_only=True, frozen=True):
    """The tube; `roughness_m` is that of the bore."""

    outer_diameter_m: DiameterM
    wall_thickness_m: WallThicknessM
    material: MaterialName | Material
    roughness_m: RoughnessM | None = 4.5e-5


class Circuit(Request, kw_only=True, frozen=True):
    """How the inside stream runs through the rows.

    `against`: the first pass lies in the last rows (overall counter-cross); `with`: in the first rows.
    `loss_coefficient`: velocity heads lost a pass at entry, exit and between passes (null: by common values).
    """

    passes: Passes | None = 1
    direction: Literal["against", "with"] | None = "against"
    loss_coefficient: LossCoefficient | None = None


class Bank(Request, kw_only=True, frozen=True):
    """A crossflow tube bank in a rectangular duct."""

    layout: Layout
    tube: Tube
    fins: None = None
    circuit: Circuit | None = Circuit()
    tube_axis: Literal["horizontal"] | None = "horizontal"


__all__ = ["Bank", "Circuit", "Curve", "Layout", "Material", "MaterialName", "Tube"]
