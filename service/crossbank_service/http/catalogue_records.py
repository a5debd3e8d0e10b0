"""Entries of the property catalogues as the contract writes them."""

from collections.abc import Mapping

import numpy as np

from crossbank.contract import (
    ConductivityCurve,
    ElasticModulusPoints,
    ExpansionPoints,
    FluidRecord,
    FuelAsFired,
    FuelRecord,
    GasRecord,
    MaterialRecord,
)
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


def gas_record(entry: properties.Species) -> GasRecord:
    """Write a gas that mixtures may hold as the contract does."""
    return GasRecord(
        name=entry.slug,
        molar_mass_kg_mol=entry.molar_mass_kg_mol,
        min_temperature_k=entry.low_k,
        max_temperature_k=entry.high_k,
        stated_error=entry.error,
        doubt=entry.doubt,
    )


def fuel_record(entry: properties.Fuel) -> FuelRecord:
    """Write a typical fuel as the contract does."""
    burning = {name: share for name, share in entry.as_fired.items() if name != "ash"}
    products = properties.combustion_products(**burning, excess_air=np.zeros(1))
    return FuelRecord(
        slug=entry.slug,
        description=entry.description,
        typical=True,
        as_fired=FuelAsFired(**entry.as_fired),
        stoichiometric_air_kg_kg=float(products.stoichiometric_air_kg_kg[0]),
        source=entry.source,
        doubt=entry.doubt,
    )


def material_record(entry: properties.Material) -> MaterialRecord:
    """Write a material of the property catalogue as the contract does."""
    temperatures, conductivities = entry.conductivity_w_m_k
    modulus, expansion = entry.elastic_modulus_pa, entry.expansion_per_k
    return MaterialRecord(
        slug=entry.slug,
        description=entry.description,
        aliases=_aliases(MATERIAL_ALIASES, entry.slug),
        conductivity_w_m_k=ConductivityCurve(temperature_k=list(temperatures), value=list(conductivities)),
        conductivity_uncertainty_fraction=entry.conductivity_uncertainty_fraction,
        density_kg_m3=entry.density_kg_m3,
        elastic_modulus_pa=modulus
        and ElasticModulusPoints(temperature_k=list(modulus[0]), value=list(modulus[1])),
        expansion_per_k=expansion
        and ExpansionPoints(temperature_k=list(expansion[0]), value=list(expansion[1])),
        poisson_ratio=entry.poisson_ratio,
        min_temperature_k=entry.lowest_temperature_k,
        max_temperature_k=entry.highest_temperature_k,
        source=entry.source,
        mechanical_source=entry.mechanical_source,
        doubt=entry.doubt,
    )


def _aliases(table: Mapping[str, str], slug: str) -> list[str]:
    return [alias for alias, meant in table.items() if meant == slug]
