"""The result of a rating. Words are plain strings: a later service may know more of them."""

from msgspec import field

from crossbank.contract._base import Result
from crossbank.contract._units import (
    AnyNumber,
    Count,
    CubicMetre,
    Kelvin,
    KelvinDifference,
    Kilogram,
    KilogramPerM2S,
    KilogramPerM3,
    KilogramPerSecond,
    Metre,
    MetrePerSecond,
    Number,
    Pascal,
    SquareMetre,
    Watt,
    WattPerK,
    WattPerM2K,
)
from crossbank.contract.rate import Reference


class ReferenceEcho(Result, kw_only=True, frozen=True):
    """The caller's own identity of the calculation."""

    equipment: str | None
    revision: str | None
    case: str | None
    order: str | None

    @classmethod
    def of(cls, reference: Reference | None) -> "ReferenceEcho | None":
        """Echo of a request's reference."""
        if reference is None:
            return None
        return cls(
            equipment=reference.equipment,
            revision=reference.revision,
            case=reference.case,
            order=reference.order,
        )


class OutsideResult(Result, kw_only=True, frozen=True):
    """The stream across the tubes; its drop is static, empty duct to empty duct, momentum included."""

    mass_flow_kg_s: KilogramPerSecond
    inlet_temperature_k: Kelvin
    outlet_temperature_k: Kelvin
    inlet_density_kg_m3: KilogramPerM3
    outlet_density_kg_m3: KilogramPerM3
    outlet_pressure_pa: Pascal
    pressure_drop_pa: Pascal
    friction_pressure_drop_pa: Pascal
    momentum_pressure_drop_pa: Pascal
    approach_velocity_m_s: MetrePerSecond
    max_velocity_m_s: MetrePerSecond
    reynolds_max: Number
    heat_transfer_coefficient_w_m2_k: WattPerM2K | None
    fin_efficiency: Number | None
    surface_efficiency: Number | None
    flow_power_w: Watt
    outlet_humidity_ratio: Number | None
    outlet_relative_humidity: Number | None
    moisture_removed_kg_s: KilogramPerSecond | None


class InsideResult(Result, kw_only=True, frozen=True):
    """The stream in the tubes; the pressure drop is header to header, bends included."""

    kind: str
    mass_flow_kg_s: KilogramPerSecond | None
    inlet_temperature_k: Kelvin | None
    outlet_temperature_k: Kelvin | None
    outlet_pressure_pa: Pascal | None
    pressure_drop_pa: Pascal | None
    heat_transfer_coefficient_w_m2_k: WattPerM2K | None
    inlet_velocity_m_s: MetrePerSecond | None
    outlet_velocity_m_s: MetrePerSecond | None
    mass_flux_kg_m2_s: KilogramPerM2S | None
    reynolds: Number | None
    saturation_temperature_k: Kelvin | None
    condensate_kg_s: KilogramPerSecond | None
    outlet_quality: Number | None
    outlet_subcooling_k: KelvinDifference | None


class ResistanceShares(Result, kw_only=True, frozen=True):
    """Shares of the overall resistance; they sum to 1."""

    outside: Number
    outside_fouling: Number
    fin_bond: Number
    wall: Number
    inside_fouling: Number
    inside: Number


class OverallResult(Result, kw_only=True, frozen=True):
    """The exchanger as a whole, on all outside surface in the duct."""

    area_m2: SquareMetre
    coefficient_w_m2_k: WattPerM2K | None
    coefficient_clean_w_m2_k: WattPerM2K | None
    ua_w_k: WattPerK | None
    log_mean_difference_k: KelvinDifference | None
    mean_difference_k: KelvinDifference | None
    crossflow_correction: Number | None
    effectiveness: Number | None
    ntu: Number | None
    closest_approach_k: KelvinDifference | None
    duty_margin_fraction: Number | None
    excess_area_fraction: Number | None
    resistance_shares: ResistanceShares | None


class GeometryResult(Result, kw_only=True, frozen=True):
    """Counts, sizes, areas and masses of the bank; `height_m` is along the tubes."""

    tube_count: Count
    width_m: Metre
    height_m: Metre
    depth_m: Metre
    face_area_m2: SquareMetre
    free_flow_area_m2: SquareMetre
    outside_area_m2: SquareMetre
    bare_area_m2: SquareMetre
    fin_area_m2: SquareMetre | None
    inside_area_m2: SquareMetre
    inside_volume_m3: CubicMetre
    dry_mass_kg: Kilogram | None
    operating_mass_kg: Kilogram | None


class WallPlace(Result, kw_only=True, frozen=True):
    """Where the metal is hottest or coldest: row (from 1 along the outside stream) and face."""

    row: Count
    face: str


class WallResult(Result, kw_only=True, frozen=True):
    """Extremes of the tube metal temperature."""

    min_temperature_k: Kelvin | None
    max_temperature_k: Kelvin | None
    min_at: WallPlace | None
    max_at: WallPlace | None
    fin_tip_max_temperature_k: Kelvin | None


class RowResult(Result, kw_only=True, frozen=True):
    """One row, counted from 1 along the outside stream."""

    row: Count
    pass_: Count | None = field(name="pass")
    heat_w: Watt
    outside_inlet_temperature_k: Kelvin
    outside_outlet_temperature_k: Kelvin
    inside_temperature_k: Kelvin | None
    wall_temperature_k: Kelvin | None
    wet: bool | None
    reynolds_max: Number
    outside_heat_transfer_coefficient_w_m2_k: WattPerM2K | None
    inside_heat_transfer_coefficient_w_m2_k: WattPerM2K | None
    pressure_drop_pa: Pascal | None
    condensate_kg_s: KilogramPerSecond | None
    outlet_quality: Number | None


class MethodUsed(Result, kw_only=True, frozen=True):
    """A correlation behind the result."""

    role: str
    method: str
    source: str
    in_range: bool
    range_note: str | None
    scatter_fraction: Number | None


class Assumed(Result, kw_only=True, frozen=True):
    """A number the request left open and the answer depends on."""

    pointer: str
    value: AnyNumber
    unit: str
    why: str


class Notice(Result, kw_only=True, frozen=True):
    """Something the reader should know; `severity` is `info`, `caution` or `warning`."""

    code: str
    severity: str
    text: str
    pointer: str | None


class Comparison(Result, kw_only=True, frozen=True):
    """The headline of the same rating by another correlation."""

    role: str
    method: str
    in_range: bool
    duty_w: Watt
    outside_outlet_temperature_k: Kelvin
    inside_outlet_temperature_k: Kelvin | None
    outside_pressure_drop_pa: Pascal
    inside_pressure_drop_pa: Pascal | None


class Record(Result, kw_only=True, frozen=True):
    """What was computed by what; `numbers` changes only when some result may move."""

    input_sha256: str
    bank_sha256: str
    contract: str
    service_version: str
    numbers: str
    properties: str


class RateResult(Result, kw_only=True, frozen=True):
    """Performance of one bank in one state; `duty_w` is the heat gained by the outside stream."""

    label: str | None
    reference: ReferenceEcho | None
    duty_w: Watt
    sensible_duty_w: Watt
    latent_duty_w: Watt
    outside: OutsideResult
    inside: InsideResult
    overall: OverallResult
    geometry: GeometryResult
    wall: WallResult
    rows: list[RowResult]
    methods: list[MethodUsed]
    assumed: list[Assumed]
    notices: list[Notice]
    comparisons: list[Comparison] | None
    sensitivities: None
    assurance: None
    solve: None
    heat_balance_residual: Number
    iterations: Count
    record: Record
