"""Fluids, flows and the two streams: what belongs to the day."""

from typing import Annotated, Literal

from msgspec import Meta

from crossbank.contract._base import Request, Tagged
from crossbank.contract._units import (
    BypassFraction,
    DifferenceK,
    ElevationM,
    ExcessAir,
    FlueOxygen,
    FluidConductivity,
    FluidDensity,
    FluidEnthalpy,
    FluidHeatCapacity,
    FluidViscosity,
    FoulingM2KW,
    Fraction,
    GaugePressurePa,
    HumidityRatio,
    MassFlowKgS,
    PressurePa,
    TemperatureK,
    VelocityMS,
    VelocityRatio,
    VolumeFlowM3S,
)

FluidName = Annotated[
    str,
    Meta(
        min_length=1,
        max_length=80,
        description="A slug of `/v1/fluids` or an alias.",
        extra={"names": "fluid"},
    ),
]

# --- fluids -----------------------------------------------------------------------------------------------


class Pure(Tagged, kw_only=True, frozen=True):
    """A pure fluid by name."""

    name: FluidName


FluidShorthand = Annotated[
    str,
    Meta(
        min_length=1,
        max_length=80,
        description="Shorthand for a pure fluid: its name.",
        extra={"names": "fluid", "shorthand": Pure},
    ),
]


class Solution(Tagged, kw_only=True, frozen=True):
    """A solution of which `mass_fraction` is the share that is not water."""

    name: FluidName
    mass_fraction: Fraction


class MoistAir(Tagged, kw_only=True, frozen=True):
    """Air with water vapour; exactly one measure of the humidity, at the inlet state."""

    relative_humidity: Fraction | None = None
    humidity_ratio: HumidityRatio | None = None
    wet_bulb_temperature_k: TemperatureK | None = None
    dew_point_temperature_k: TemperatureK | None = None

    exactly_one = (
        ("relative_humidity", "humidity_ratio", "wet_bulb_temperature_k", "dew_point_temperature_k"),
    )


class MoleFractions(Request, kw_only=True, frozen=True):
    """Mole fractions of a mixture, water vapour included; they add to 1 within 0.001 and are then normalised."""

    nitrogen: Fraction | None = 0.0
    oxygen: Fraction | None = 0.0
    carbon_dioxide: Fraction | None = 0.0
    water: Fraction | None = 0.0
    argon: Fraction | None = 0.0
    sulfur_dioxide: Fraction | None = 0.0
    carbon_monoxide: Fraction | None = 0.0
    hydrogen: Fraction | None = 0.0
    helium: Fraction | None = 0.0
    methane: Fraction | None = 0.0
    ethane: Fraction | None = 0.0
    propane: Fraction | None = 0.0
    n_butane: Fraction | None = 0.0
    ammonia: Fraction | None = 0.0


class GasMixture(Tagged, kw_only=True, frozen=True):
    """A mixture of gases at low density, such as flue gas whose composition is known."""

    mole_fractions: MoleFractions


class CombustionGas(Tagged, kw_only=True, frozen=True):
    """Flue gas of complete combustion, from the fuel and how much air it burnt with.

    `carbon` to `ash`: mass fractions of the fuel as fired; they add to 1 within 0.001 and are then normalised. The
    air by one of `excess_air` (above the stoichiometric, as a fraction of it) and `dry_oxygen_mole_fraction` (oxygen in
    the dried flue gas). `air_humidity_ratio`: of the combustion air. `/v1/fluids` lists typical fuels.
    """

    carbon: Fraction | None = 0.0
    hydrogen: Fraction | None = 0.0
    sulfur: Fraction | None = 0.0
    oxygen: Fraction | None = 0.0
    nitrogen: Fraction | None = 0.0
    water: Fraction | None = 0.0
    ash: Fraction | None = 0.0
    excess_air: ExcessAir | None = None
    dry_oxygen_mole_fraction: FlueOxygen | None = None
    air_humidity_ratio: HumidityRatio | None = 0.0

    exactly_one = (("excess_air", "dry_oxygen_mole_fraction"),)


class Table(Tagged, kw_only=True, frozen=True):
    """A fluid by the caller's own numbers over temperature; one point means constant properties.

    `enthalpy_j_kg` null: the integral of the heat capacity. `pressure_pa`: where a gas's density was taken,
    so that it can follow the pressure; null: the density stays as written.
    """

    temperature_k: Annotated[list[TemperatureK], Meta(min_length=1, max_length=500)]
    density_kg_m3: Annotated[list[FluidDensity], Meta(min_length=1, max_length=500)]
    heat_capacity_j_kg_k: Annotated[list[FluidHeatCapacity], Meta(min_length=1, max_length=500)]
    conductivity_w_m_k: Annotated[list[FluidConductivity], Meta(min_length=1, max_length=500)]
    viscosity_pa_s: Annotated[list[FluidViscosity], Meta(min_length=1, max_length=500)]
    enthalpy_j_kg: Annotated[list[FluidEnthalpy], Meta(min_length=1, max_length=500)] | None = None
    pressure_pa: PressurePa | None = None
    gas: bool | None = False

    same_length = (
        (
            "temperature_k",
            "density_kg_m3",
            "heat_capacity_j_kg_k",
            "conductivity_w_m_k",
            "viscosity_pa_s",
            "enthalpy_j_kg",
        ),
    )


Fluid = FluidShorthand | Pure | Solution | MoistAir | GasMixture | CombustionGas | Table

# --- flows ------------------------------------------------------------------------------------------------


class Mass(Tagged, kw_only=True, frozen=True):
    """Mass flow, moisture included."""

    kg_s: MassFlowKgS


class DryMass(Tagged, kw_only=True, frozen=True):
    """Mass flow of the dry gas, its vapour left out; for moist air and gas mixtures."""

    kg_s: MassFlowKgS


class ActualVolume(Tagged, kw_only=True, frozen=True):
    """Volume flow at the bank's inlet state."""

    m3_s: VolumeFlowM3S


class ReferenceVolume(Tagged, kw_only=True, frozen=True):
    """Volume flow at a reference state (normal or standard volume); `dry`: of the gas without its vapour."""

    m3_s: VolumeFlowM3S
    reference_temperature_k: TemperatureK
    reference_pressure_pa: PressurePa
    basis: Literal["wet", "dry"] | None = "wet"


class ApproachVelocity(Tagged, kw_only=True, frozen=True):
    """Velocity in the empty duct section at the bank's inlet state."""

    m_s: VelocityMS


Flow = Mass | DryMass | ActualVolume | ReferenceVolume | ApproachVelocity

# --- streams ----------------------------------------------------------------------------------------------


class FaceZone(Request, kw_only=True, frozen=True):
    """Part of the face with a velocity of its own.

    Area shares sum to 1, and so do the products of share and `velocity_ratio` (over the mean velocity).
    """

    area_share: Fraction
    velocity_ratio: VelocityRatio


class Outside(Request, kw_only=True, frozen=True):
    """The stream across the tubes; its pressure directly or by the elevation of the site, exactly one.

    `distribution` parts the face into zones of uneven velocity; `bypass_fraction` of the flow passes by the bank.
    `inlet_gauge_pressure_pa` goes with `elevation_m`: above the atmosphere there, negative for a draught.
    """

    fluid: Fluid
    flow: Flow
    inlet_temperature_k: TemperatureK
    inlet_pressure_pa: PressurePa | None = None
    elevation_m: ElevationM | None = None
    inlet_gauge_pressure_pa: GaugePressurePa | None = None
    fouling_m2_k_w: FoulingM2KW | None = 0.0
    distribution: Annotated[list[FaceZone], Meta(min_length=2, max_length=50)] | None = None
    bypass_fraction: BypassFraction | None = 0.0

    exactly_one = (("inlet_pressure_pa", "elevation_m"),)


class HeldSurface(Tagged, kw_only=True, frozen=True):
    """The outer tube surface is held at one temperature."""

    temperature_k: TemperatureK


class Condensing(Tagged, kw_only=True, frozen=True):
    """Vapour condenses inside, as much as is needed; inlet header pressure or saturation temperature."""

    fluid: FluidShorthand | Pure
    inlet_pressure_pa: PressurePa | None = None
    saturation_temperature_k: TemperatureK | None = None
    inlet_superheat_k: DifferenceK | None = None
    fouling_m2_k_w: FoulingM2KW | None = 0.0

    exactly_one = (("inlet_pressure_pa", "saturation_temperature_k"),)


class SinglePhase(Tagged, kw_only=True, frozen=True):
    """A liquid or gas flows inside without changing phase."""

    fluid: Fluid
    flow_kg_s: MassFlowKgS
    inlet_temperature_k: TemperatureK
    inlet_pressure_pa: PressurePa
    fouling_m2_k_w: FoulingM2KW | None = 0.0


Inside = HeldSurface | Condensing | SinglePhase
