"""What the catalogues say, and that all of it can be asked for."""

import numpy as np
import pytest

from crossbank_service import properties
from crossbank_service.properties import (
    FluidRecord,
    Material,
    PureSinglePhase,
    Saturation,
    Solution,
    conductivity,
    fluid_records,
    freezing_temperature,
    material,
    material_records,
    phase_at,
)


def test_slugs_are_unique_lower_case_words() -> None:
    """Every slug is lower case with hyphens, and no two are alike."""
    for slugs in ([r.slug for r in fluid_records()], [m.slug for m in material_records()]):
        assert len(set(slugs)) == len(slugs)
        for slug in slugs:
            assert slug == slug.lower().strip()
            assert set(slug) <= set("abcdefghijklmnopqrstuvwxyz0123456789-.")


@pytest.mark.parametrize("record", fluid_records(), ids=lambda r: r.slug)
def test_every_fluid_on_offer_can_be_had(record: FluidRecord) -> None:
    """Each record's fluid gives properties at a state within its limits, and condenses if it says so."""
    assert record.lowest_temperature_k < record.highest_temperature_k
    if record.kind == "solution":
        assert record.highest_mass_fraction is not None
        x = np.array([0.5 * record.highest_mass_fraction])
        assert freezing_temperature(record.slug, x)[0] < 300.0
        state = Solution(record.slug, x).at(np.array([300.0]), np.array(2e5))
    else:
        t = min(max(300.0, record.lowest_temperature_k + 1.0), record.highest_temperature_k - 1.0)
        phase = phase_at(record.slug, t, 1e5)
        assert phase in record.phases
        state = PureSinglePhase(record.slug, "gas" if phase == "gas" else "liquid").at(
            np.array([t]), np.array(1e5)
        )
    assert 0.3 < state.prandtl[0] < 1e4
    if record.condensing:
        assert Saturation(record.slug).at(np.array([1e5])).latent_heat_j_kg[0] > 1e4
    else:
        with pytest.raises(KeyError):
            Saturation(record.slug)


@pytest.mark.parametrize("record", material_records(), ids=lambda m: m.slug)
def test_every_metal_is_consistent(record: Material) -> None:
    """Curves rise in temperature, values are those of metals, the source is named."""
    t, k = record.conductivity_w_m_k
    assert np.all(np.diff(t) > 0.0)
    assert len(t) == len(k)
    assert all(10.0 < v < 410.0 for v in k)
    assert 2500.0 < record.density_kg_m3 < 9000.0
    assert record.source
    if record.elastic_modulus_pa is not None:
        assert len(record.elastic_modulus_pa[0]) == len(record.elastic_modulus_pa[1])
        assert np.all(np.diff(record.elastic_modulus_pa[1]) < 0.0)
    if record.expansion_per_k is not None:
        assert all(5e-6 < v < 3e-5 for v in record.expansion_per_k[1])


@pytest.mark.parametrize(
    ("slug", "celsius", "formula", "tolerance"),
    [
        ("stainless-304", (20.0, 500.0), lambda t: 14.6 + 0.0127 * t, 0.06),
        ("carbon-steel", (20.0, 500.0), lambda t: 54.0 - 0.0333 * t, 0.16),
    ],
)
def test_steels_are_near_the_fire_code(
    slug: str, celsius: tuple[float, float], formula: object, tolerance: float
) -> None:
    """Steels agree with the linear laws of EN 1993-1-2 within the spread of steels."""
    assert callable(formula)
    for t in np.linspace(*celsius, 7):
        k = conductivity([slug])(np.array([t + 273.15]))[0]
        assert k == pytest.approx(formula(t), rel=tolerance)


def test_conductivity_is_linear_between_points_and_held_beyond() -> None:
    """Carbon steel at 60 C lies between 60.4 and 58.0; outside the table the ends hold."""
    k = conductivity(["carbon-steel", "copper"])(np.array([[333.15, 200.0, 1200.0]] * 2))
    assert k[0] == pytest.approx([59.2, 60.4, 40.5])
    assert k[1] == pytest.approx([340.0, 340.0, 330.0])


def test_unknown_metal_is_refused_with_the_known_ones() -> None:
    """A metal that is not there is refused, naming it and what there is."""
    with pytest.raises(KeyError, match=r"mithril.*carbon-steel"):
        material("mithril")


def test_the_front_door_is_complete() -> None:
    """``__all__`` names exactly what the package exports."""
    public = {
        name
        for name, value in vars(properties).items()
        if not name.startswith("_") and not hasattr(value, "__path__") and type(value).__name__ != "module"
    }
    assert public == set(properties.__all__)
