"""Metals of tubes and fins: conductivity, density, elastic modulus and expansion over temperature."""

from collections.abc import Sequence
from dataclasses import dataclass

from crossbank_service.properties._arrays import Curve

CELSIUS = 273.15


@dataclass(frozen=True, slots=True, kw_only=True)
class Material:
    """One metal; curves are (temperatures [K], values), linear between the points, end values beyond.

    Attributes
    ----------
    slug, description : str
        Name in requests, and what it is.
    conductivity_w_m_k : pair of tuples
        Thermal conductivity [W/(m K)].
    density_kg_m3 : float
        At room temperature.
    elastic_modulus_pa, expansion_per_k : pair of tuples or None
        Young's modulus; mean linear expansion from 293.15 K to the temperature.
    poisson_ratio : float
        Of the elastic range.
    lowest_temperature_k, highest_temperature_k : float
        Range of the conductivity's points (not a service limit).
    conductivity_uncertainty_fraction : float
        Half width of what similar tubes and sheets show.
    source : str
        Where the conductivity is from.
    mechanical_source : str or None
        Where modulus and expansion are from.
    doubt : str or None
        What to know before relying on it.
    """

    slug: str
    description: str
    conductivity_w_m_k: tuple[tuple[float, ...], tuple[float, ...]]
    density_kg_m3: float
    elastic_modulus_pa: tuple[tuple[float, ...], tuple[float, ...]] | None
    expansion_per_k: tuple[tuple[float, ...], tuple[float, ...]] | None
    poisson_ratio: float
    lowest_temperature_k: float
    highest_temperature_k: float
    conductivity_uncertainty_fraction: float
    source: str
    mechanical_source: str | None
    doubt: str | None


_STEPS = (20.0, 100.0, 200.0, 300.0, 400.0, 500.0)

_CARBON_STEEL = ((202, 198, 192, 185, 171, 151), (12.1, 12.7, 13.3, 13.8))
_CHROME_MOLY = ((205, 201, 194, 187, 179, 170), (12.0, 12.5, 13.0, 13.5))
_FERRITIC = ((201, 195, 189, 182, 171), (10.3, 10.7, 11.0, 11.3))
_AUSTENITIC = ((195, 189, 183, 176, 169, 160), (16.5, 17.1, 17.6, 18.0))
_DUPLEX = ((200, 194, 186, 180), (13.0, 13.5, 14.0))
_COPPER = ((117, 114, 110, 106), (16.8, 17.3, 17.7))
_CUPRONICKEL = ((124, 121, 117, 112), (17.0, 17.3, 17.5))
_BRASS = ((110, 107, 103), (19.5, 20.0))
_TITANIUM = ((107, 103, 97, 88), (8.6, 8.9, 9.1))
_ALUMINIUM = ((69, 66, 60), (23.6, 24.4))


_MECHANICAL = (
    "common values of the metal's group as in ASME BPVC Section II Part D, tables TM and TE, from memory: modulus "
    "within 3 %, expansion within 5 %"
)


def _metal(
    slug: str,
    description: str,
    conductivity: Sequence[float],
    density: float,
    mechanics: tuple[Sequence[float], Sequence[float]] | None,
    *,
    source: str,
    doubt: str | None = None,
    uncertainty: float = 0.1,
    poisson: float = 0.30,
) -> Material:
    def points(
        values: Sequence[float], start: int, scale: float
    ) -> tuple[tuple[float, ...], tuple[float, ...]]:
        steps = _STEPS[start : start + len(values)]
        return tuple(t + CELSIUS for t in steps), tuple(v * scale for v in values)

    curve = points(conductivity, 0, 1.0)
    return Material(
        slug=slug,
        description=description,
        conductivity_w_m_k=curve,
        density_kg_m3=density,
        elastic_modulus_pa=None if mechanics is None else points(mechanics[0], 0, 1e9),
        expansion_per_k=None if mechanics is None else points(mechanics[1], 1, 1e-6),
        poisson_ratio=poisson,
        lowest_temperature_k=curve[0][0],
        highest_temperature_k=curve[0][-1],
        conductivity_uncertainty_fraction=uncertainty,
        source=source,
        mechanical_source=None if mechanics is None else _MECHANICAL,
        doubt=doubt,
    )


_MEMORY = "Values from memory of the source; a mill certificate or your own values go first."

_MATERIALS = (
    _metal(
        "carbon-steel",
        "plain carbon steel",
        (60.4, 58.0, 53.6, 49.2, 44.9, 40.5),
        7850.0,
        _CARBON_STEEL,
        source="ASME BPVC Section II Part D, table TCD, group A; EN 1993-1-2 gives 54 - 0.0333 t(C)",
        doubt="Boiler steels with manganese and silicon are 5-15 % lower. " + _MEMORY,
    ),
    _metal(
        "chromium-molybdenum-1cr",
        "1Cr-1/2Mo steel, 13CrMo4-5",
        (42.0, 42.0, 41.0, 40.0, 38.0, 36.0),
        7850.0,
        _CHROME_MOLY,
        source="EN 10216-2, annex",
        doubt=_MEMORY,
    ),
    _metal(
        "chromium-molybdenum-2.25cr",
        "2 1/4Cr-1Mo steel, 10CrMo9-10",
        (36.0, 37.0, 37.0, 37.0, 36.0, 35.0),
        7850.0,
        _CHROME_MOLY,
        source="EN 10216-2, annex",
        doubt=_MEMORY,
    ),
    _metal(
        "ferritic-12cr",
        "ferritic stainless steel with 11-13 % chromium (types 409, 410)",
        (25.0, 25.5, 26.0, 26.5, 27.0, 27.5),
        7700.0,
        _FERRITIC,
        source="ASME BPVC Section II Part D, table TCD",
        doubt=_MEMORY,
    ),
    _metal(
        "stainless-304",
        "austenitic stainless steel, type 304",
        (14.8, 16.2, 17.9, 19.4, 20.8, 22.2),
        8000.0,
        _AUSTENITIC,
        source="ASME BPVC Section II Part D, table TCD, group J; EN 1993-1-2 gives 14.6 + 0.0127 t(C)",
        doubt=_MEMORY,
        uncertainty=0.05,
    ),
    _metal(
        "stainless-316",
        "austenitic stainless steel, type 316",
        (14.1, 15.4, 16.8, 18.3, 19.7, 21.2),
        8000.0,
        _AUSTENITIC,
        source="ASME BPVC Section II Part D, table TCD, group K",
        doubt=_MEMORY,
        uncertainty=0.05,
    ),
    _metal(
        "duplex-2205",
        "duplex stainless steel, 22 % chromium",
        (15.0, 16.0, 17.0, 18.0),
        7800.0,
        _DUPLEX,
        source="EN 10088-1",
        doubt=_MEMORY,
        uncertainty=0.05,
    ),
    _metal(
        "copper",
        "phosphorus-deoxidised copper (DHP), as of tubes and coil fins",
        (340.0, 340.0, 335.0, 330.0),
        8940.0,
        _COPPER,
        source="EN 12449, suppliers' data",
        doubt="Between 290 and 365 with the phosphorus left in it. " + _MEMORY,
        poisson=0.33,
        uncertainty=0.12,
    ),
    _metal(
        "copper-pure",
        "high-conductivity copper",
        (398.0, 393.0, 389.0, 384.0),
        8940.0,
        _COPPER,
        source="Ho, Powell and Liley, J. Phys. Chem. Ref. Data 1 (1972) 279",
        doubt="Coil tube is not this metal but phosphorus-deoxidised copper.",
        poisson=0.33,
        uncertainty=0.03,
    ),
    _metal(
        "cupronickel-90-10",
        "copper with 10 % nickel",
        (45.0, 50.0, 57.0),
        8900.0,
        _CUPRONICKEL,
        source="suppliers' data, common practice, no single source",
        doubt=_MEMORY,
        poisson=0.33,
    ),
    _metal(
        "cupronickel-70-30",
        "copper with 30 % nickel",
        (29.0, 32.0, 36.0),
        8950.0,
        None,
        source="suppliers' data, common practice, no single source",
        doubt=_MEMORY,
        poisson=0.33,
    ),
    _metal(
        "admiralty-brass",
        "brass with 28 % zinc and 1 % tin",
        (110.0, 120.0, 130.0),
        8500.0,
        _BRASS,
        source="suppliers' data, common practice, no single source",
        doubt="The rise with temperature is uncertain. " + _MEMORY,
        poisson=0.33,
    ),
    _metal(
        "aluminium-brass",
        "brass with 22 % zinc and 2 % aluminium",
        (100.0, 108.0, 116.0),
        8350.0,
        _BRASS,
        source="suppliers' data, common practice, no single source",
        doubt="The rise with temperature is uncertain. " + _MEMORY,
        poisson=0.33,
    ),
    _metal(
        "aluminium",
        "commercially pure aluminium, 1100 type",
        (222.0, 223.0, 224.0),
        2710.0,
        _ALUMINIUM,
        source="ASM Handbook volume 2; the change with temperature is that of 1050",
        doubt=_MEMORY,
        poisson=0.33,
        uncertainty=0.05,
    ),
    _metal(
        "aluminium-1050",
        "aluminium of 99.5 %",
        (229.0, 230.0, 231.0),
        2705.0,
        _ALUMINIUM,
        source="ASM Handbook volume 2",
        doubt=_MEMORY,
        poisson=0.33,
        uncertainty=0.05,
    ),
    _metal(
        "aluminium-3003",
        "aluminium with 1.2 % manganese",
        (159.0, 165.0),
        2730.0,
        _ALUMINIUM,
        source="ASM Handbook volume 2",
        doubt="Half-hard sheet; 193 when annealed. " + _MEMORY,
        poisson=0.33,
        uncertainty=0.15,
    ),
    _metal(
        "aluminium-6063",
        "aluminium with magnesium and silicon, for extrusions",
        (200.0, 205.0),
        2700.0,
        _ALUMINIUM,
        source="ASM Handbook volume 2",
        doubt=_MEMORY,
        poisson=0.33,
        uncertainty=0.05,
    ),
    _metal(
        "titanium-grade-2",
        "commercially pure titanium",
        (20.8, 20.1, 19.5, 19.3),
        4510.0,
        _TITANIUM,
        source="suppliers' data; Ho, Powell and Liley give 21.9 for pure titanium at 300 K",
        doubt=_MEMORY,
    ),
)

MATERIALS: dict[str, Material] = {m.slug: m for m in _MATERIALS}


def material(slug: str) -> Material:
    """Look up a metal; ``KeyError`` lists what there is."""
    try:
        return MATERIALS[slug]
    except KeyError:
        raise KeyError(f"unknown material {slug!r}; known materials: {', '.join(MATERIALS)}") from None


def conductivity(slugs: Sequence[str]) -> Curve:
    """Conductivity curves [W/(m K)] of one metal a case, to be called with temperatures of shape (N, ...)."""
    return Curve.of([material(slug).conductivity_w_m_k for slug in slugs])


def material_records() -> tuple[Material, ...]:
    """All metals on offer."""
    return _MATERIALS
