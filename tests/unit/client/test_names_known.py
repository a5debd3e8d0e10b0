"""The names the contract resolves to are names the service knows."""

import pytest

from crossbank.contract.names import FLUID_ALIASES, MATERIAL_ALIASES
from crossbank_service.properties import fluid_records, material_records


@pytest.mark.parametrize(
    ("aliases", "records"), [(FLUID_ALIASES, fluid_records), (MATERIAL_ALIASES, material_records)]
)
def test_every_alias_leads_to_a_known_slug(aliases: dict[str, str], records: object) -> None:
    """No alias leads nowhere, and none hides a slug."""
    assert callable(records)
    known = {record.slug for record in records()}
    assert set(aliases.values()) <= known
    assert not set(aliases) & known
