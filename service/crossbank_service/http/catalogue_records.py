"""Entries of the property catalogues as the contract writes them."""

from collections.abc import Mapping

from crossbank.contract import ConductivityCurve, FluidRecord, MaterialRecord
from crossbank.contract.names import FLUID_ALIASES, MATERIAL_ALIASES
from crossbank_service import properties


def fluid_record(entry: properties.FluidRecord) -> FluidRecord:
    """Write a fluid of the property catalogue as the contract does."""
    return FluidRecord(
        slug=entry.slug,
        kind=entry.kind,
        aliases=_aliases(FLUID_ALIASES, entry.slug),
        min_temperature_k=entry.lowest_temperature_k,
        max_temperature_k=entry.highest_temperature_k,
        max_pressure_pa=entry.highest_pressure_pa,
        min_mass_fraction=None if entry.highest_mass_fraction is None else 0.0,
        max_mass_fraction=entry.highest_mass_fraction,
        freezing=entry.limits_note,
        single_phase=bool(entry.phases),
        condensing=entry.condensing,
        source=entry.source,
        stated_error=entry.stated_error,
        doubt=entry.doubt,
    )


def material_record(entry: properties.Material) -> MaterialRecord:
    """Write a material of the property catalogue as the contract does."""
    temperatures, conductivities = entry.conductivity_w_m_k
    return MaterialRecord(
        slug=entry.slug,
        aliases=_aliases(MATERIAL_ALIASES, entry.slug),
        conductivity_w_m_k=ConductivityCurve(temperature_k=list(temperatures), value=list(conductivities)),
        density_kg_m3=entry.density_kg_m3,
        min_temperature_k=entry.lowest_temperature_k,
        max_temperature_k=entry.highest_temperature_k,
        source=entry.source,
        doubt=entry.doubt,
    )


def _aliases(table: Mapping[str, str], slug: str) -> list[str]:
    return [alias for alias, meant in table.items() if meant == slug]
