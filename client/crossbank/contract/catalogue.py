"""Answers of the catalogue calls: what the service is, knows and says."""

from crossbank.contract._base import Result
from crossbank.contract._units import (
    AnyNumber,
    Count,
    Kelvin,
    KilogramPerM3,
    Number,
    Pascal,
    PerKelvin,
    WattPerMK,
)


class ServiceLimits(Result, kw_only=True, frozen=True):
    """Limits of this service."""

    body_bytes: Count


class ServiceInfo(Result, kw_only=True, frozen=True):
    """Answer of `GET /v1`."""

    contract: str
    service_version: str
    numbers: str
    properties: str
    limits: ServiceLimits


class MethodInput(Result, kw_only=True, frozen=True):
    """One input of a correlation, named as in the nomenclature."""

    name: str
    symbol: str
    unit: str
    meaning: str
    required: bool
    at_least: AnyNumber | None
    at_most: AnyNumber | None
    one_of: list[str] | None


class MethodLimit(Result, kw_only=True, frozen=True):
    """Published range of validity in one quantity; null is open-ended."""

    quantity: str
    at_least: AnyNumber | None
    at_most: AnyNumber | None


class MethodRecord(Result, kw_only=True, frozen=True):
    """One published correlation: what it gives, from what, where it holds, how well, who says so."""

    slug: str
    role: str
    surfaces: list[str]
    arrangements: list[str]
    gives: str
    inputs: list[MethodInput]
    range: list[MethodLimit]
    source: str
    doubt: str | None
    note: str | None
    scatter_fraction: Number | None
    standard_uncertainty_fraction: Number | None
    properties_at: str


class MethodRecords(Result, kw_only=True, frozen=True):
    """Answer of `GET /v1/methods` and `GET /v1/methods/{slug}` (a slug may serve two roles)."""

    methods: list[MethodRecord]


class Evaluation(Result, kw_only=True, frozen=True):
    """Answer of `POST /v1/methods/{slug}`: numbers for numbers, lists for lists."""

    method: str
    gives: str
    unit: str
    values: AnyNumber | list[AnyNumber]
    in_range: bool | list[bool]
    range_note: str | list[str | None] | None


class FluidRecord(Result, kw_only=True, frozen=True):
    """One fluid: names, limits, what it can be used for, how well it is known."""

    slug: str
    kind: str
    aliases: list[str]
    min_temperature_k: Kelvin | None
    max_temperature_k: Kelvin | None
    max_pressure_pa: Pascal | None
    min_mass_fraction: Number | None
    max_mass_fraction: Number | None
    freezing: str | None
    single_phase: bool
    condensing: bool
    source: str
    stated_error: str | None
    doubt: str | None


class GasRecord(Result, kw_only=True, frozen=True):
    """One gas that a `gas-mixture` may hold; `name` is its member in `mole_fractions`."""

    name: str
    molar_mass_kg_mol: Number
    min_temperature_k: Kelvin
    max_temperature_k: Kelvin
    stated_error: str
    doubt: str | None


class FuelAsFired(Result, kw_only=True, frozen=True):
    """Mass fractions of a fuel as fired, as a `combustion-gas` takes them."""

    carbon: Number
    hydrogen: Number
    sulfur: Number
    oxygen: Number
    nitrogen: Number
    water: Number
    ash: Number


class FuelRecord(Result, kw_only=True, frozen=True):
    """A typical fuel: a composition to start from where no analysis is at hand."""

    slug: str
    description: str
    typical: bool
    as_fired: FuelAsFired
    stoichiometric_air_kg_kg: Number
    source: str
    doubt: str


class FluidRecords(Result, kw_only=True, frozen=True):
    """Answer of `GET /v1/fluids`."""

    fluids: list[FluidRecord]
    gases: list[GasRecord]
    fuels: list[FuelRecord]


class ConductivityCurve(Result, kw_only=True, frozen=True):
    """Conductivity by temperature: linear between the points, constant beyond the ends."""

    temperature_k: list[Kelvin]
    value: list[WattPerMK]


class ElasticModulusPoints(Result, kw_only=True, frozen=True):
    """Young's modulus by temperature."""

    temperature_k: list[Kelvin]
    value: list[Pascal]


class ExpansionPoints(Result, kw_only=True, frozen=True):
    """Mean linear expansion from 293.15 K to each temperature."""

    temperature_k: list[Kelvin]
    value: list[PerKelvin]


class MaterialRecord(Result, kw_only=True, frozen=True):
    """One material: names, properties by temperature, where the numbers are from, what is doubtful.

    `min_temperature_k` and `max_temperature_k` bound the points of the conductivity, they are no limits of use. Curves
    are linear between their points and constant beyond.
    """

    slug: str
    description: str
    aliases: list[str]
    conductivity_w_m_k: ConductivityCurve
    conductivity_uncertainty_fraction: Number
    density_kg_m3: KilogramPerM3 | None
    elastic_modulus_pa: ElasticModulusPoints | None
    expansion_per_k: ExpansionPoints | None
    poisson_ratio: Number
    min_temperature_k: Kelvin | None
    max_temperature_k: Kelvin | None
    source: str
    mechanical_source: str | None
    doubt: str | None


class MaterialRecords(Result, kw_only=True, frozen=True):
    """Answer of `GET /v1/materials`."""

    materials: list[MaterialRecord]


class NoticeRecord(Result, kw_only=True, frozen=True):
    """One notice the service can give."""

    code: str
    severity: str
    meaning: str


class NoticeRecords(Result, kw_only=True, frozen=True):
    """Answer of `GET /v1/notices`."""

    notices: list[NoticeRecord]
