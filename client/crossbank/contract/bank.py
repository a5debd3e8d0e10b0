"""The bank: what belongs to the equipment."""

from typing import Annotated, Literal

from msgspec import Meta

from crossbank.contract._base import Request, Tagged
from crossbank.contract._units import (
    DiameterM,
    ElasticModulusPa,
    ExpansionPerK,
    FinHeightM,
    FinPitchM,
    FinThicknessM,
    FoulingM2KW,
    GapM,
    LengthM,
    LossCoefficient,
    MetalConductivity,
    MetalDensity,
    Passes,
    PitchM,
    RoughnessM,
    Rows,
    StressPa,
    Strips,
    TemperatureK,
    TubesPerRow,
    WallThicknessM,
    Word,
    YawRad,
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


class ElasticModulusCurve(Request, kw_only=True, frozen=True):
    """Young's modulus by temperature: linear between the points, constant beyond the ends."""

    temperature_k: Annotated[list[TemperatureK], Meta(min_length=1, max_length=200)]
    value: Annotated[list[ElasticModulusPa], Meta(min_length=1, max_length=200)]

    same_length = (("temperature_k", "value"),)


class ExpansionCurve(Request, kw_only=True, frozen=True):
    """Mean linear expansion from 293.15 K to each temperature: linear between the points, constant beyond."""

    temperature_k: Annotated[list[TemperatureK], Meta(min_length=1, max_length=200)]
    value: Annotated[list[ExpansionPerK], Meta(min_length=1, max_length=200)]

    same_length = (("temperature_k", "value"),)


class YieldStressCurve(Request, kw_only=True, frozen=True):
    """Yield stress by temperature: linear between the points, constant beyond the ends."""

    temperature_k: Annotated[list[TemperatureK], Meta(min_length=1, max_length=200)]
    value: Annotated[list[StressPa], Meta(min_length=1, max_length=200)]

    same_length = (("temperature_k", "value"),)


class Material(Request, kw_only=True, frozen=True):
    """A metal of the caller's own.

    A rating uses conductivity and density. `elastic_modulus_pa`, `expansion_per_k` (mean from 293.15 K),
    `yield_stress_pa` and `max_temperature_k` are carried for checks, so that one stored bank serves every call; they
    do not change a rating.
    """

    name: Word
    conductivity_w_m_k: MetalConductivity | Curve
    density_kg_m3: MetalDensity | None = None
    elastic_modulus_pa: ElasticModulusPa | ElasticModulusCurve | None = None
    expansion_per_k: ExpansionPerK | ExpansionCurve | None = None
    yield_stress_pa: StressPa | YieldStressCurve | None = None
    max_temperature_k: TemperatureK | None = None


class Cavity(Request, kw_only=True, frozen=True):
    """An empty stretch of duct behind row `after_row`, `depth_m` from tube surface to tube surface."""

    after_row: Rows
    depth_m: PitchM


class Lane(Request, kw_only=True, frozen=True):
    """An open lane beside the tubes, from inlet to outlet, that widens the duct by `width_m`.

    `strips` counts the sealing strips across it.
    """

    width_m: PitchM
    strips: Strips | None = 0


class Layout(Request, kw_only=True, frozen=True):
    """Where the tubes stand in the duct.

    `tubes_per_row` counts row 1; `tube_length_m` is the length in the duct; `side_gap_m` is the clear
    distance from the outermost tube (fin tip) of row 1 to the wall (null: half the clear gap between them).
    `cavities` part the rows into bundles in series; `lanes` let part of the stream pass unheated; `yaw_rad` is the
    angle by which the stream leaves the normal to the tubes.
    """

    arrangement: Literal["inline", "staggered"]
    transverse_pitch_m: PitchM
    longitudinal_pitch_m: PitchM
    rows: Rows
    tubes_per_row: TubesPerRow
    tube_length_m: LengthM
    side_gap_m: GapM | None = None
    cavities: Annotated[list[Cavity], Meta(min_length=1, max_length=50)] | None = None
    lanes: Annotated[list[Lane], Meta(min_length=1, max_length=20)] | None = None
    yaw_rad: YawRad | None = 0.0


class Tube(Request, kw_only=True, frozen=True):
    """The tube; `roughness_m` is that of the bore."""

    outer_diameter_m: DiameterM
    wall_thickness_m: WallThicknessM
    material: MaterialName | Material
    roughness_m: RoughnessM | None = 4.5e-5


Attachment = Literal["tension-wound", "overlapped-foot", "embedded", "extruded", "brazed", "welded"]


class Annular(Tagged, kw_only=True, frozen=True):
    """Solid annular fins: `height_m` from tube to tip, `pitch_m` centre to centre.

    `bond_resistance_m2_k_w` between fin and tube on the bare tube (null: typical of the attachment, none without one).
    """

    height_m: FinHeightM
    thickness_m: FinThicknessM
    pitch_m: FinPitchM
    material: MaterialName | Material
    bond_resistance_m2_k_w: FoulingM2KW | None = None
    attachment: Attachment | None = None


class Serrated(Tagged, kw_only=True, frozen=True):
    """Annular fins cut into segments of `segment_width_m`; `cut_depth_m` from the tip (null: to the tube)."""

    height_m: FinHeightM
    thickness_m: FinThicknessM
    pitch_m: FinPitchM
    segment_width_m: FinHeightM
    cut_depth_m: FinHeightM | None = None
    material: MaterialName | Material
    bond_resistance_m2_k_w: FoulingM2KW | None = None
    attachment: Attachment | None = None


class Plate(Tagged, kw_only=True, frozen=True):
    """Continuous flat plates over all tubes, with full collars; `pitch_m` centre to centre."""

    thickness_m: FinThicknessM
    pitch_m: FinPitchM
    material: MaterialName | Material
    bond_resistance_m2_k_w: FoulingM2KW | None = None


class RowGroup(Request, kw_only=True, frozen=True):
    """Rows `first_row` to `last_row` (from 1 along the outside stream) with a surface of their own.

    `tube` null: the bank's tube; `fins` null: bare tubes.
    """

    first_row: Rows
    last_row: Rows
    tube: Tube | None = None
    fins: Annular | Serrated | Plate | None = None


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
    fins: Annular | Serrated | Plate | None = None
    row_groups: Annotated[list[RowGroup], Meta(min_length=1, max_length=200)] | None = None
    circuit: Circuit | None = Circuit()
    tube_axis: Literal["horizontal"] | None = "horizontal"


__all__ = [
    "Annular",
    "Bank",
    "Cavity",
    "Circuit",
    "Curve",
    "ElasticModulusCurve",
    "ExpansionCurve",
    "Lane",
    "Layout",
    "Material",
    "MaterialName",
    "Plate",
    "RowGroup",
    "Serrated",
    "Tube",
    "YieldStressCurve",
]
