"""Names accepted beside the slugs: exact lower-case words only; an unknown word passes as it is."""

FLUID_ALIASES = {
    "steam": "water",
    "h2o": "water",
    "r718": "water",
    "nh3": "ammonia",
    "r717": "ammonia",
    "co2": "carbon-dioxide",
    "r744": "carbon-dioxide",
    "n2": "nitrogen",
    "r728": "nitrogen",
    "o2": "oxygen",
    "ar": "argon",
    "h2": "hydrogen",
    "he": "helium",
    "dry-air": "air",
    "ch4": "methane",
    "r50": "methane",
    "r170": "ethane",
    "r290": "propane",
    "r600": "n-butane",
    "butane": "n-butane",
    "r600a": "isobutane",
    "pentane": "n-pentane",
    "hexane": "n-hexane",
    "heptane": "n-heptane",
    "octane": "n-octane",
    "r1270": "propylene",
    "propene": "propylene",
    "sf6": "sulfur-hexafluoride",
    "r-134a": "r134a",
    "r-32": "r32",
    "r-1234yf": "r1234yf",
    "r-1234ze-e": "r1234ze-e",
    "r1234ze": "r1234ze-e",
    "r-245fa": "r245fa",
    "ethyl-alcohol": "ethanol",
    "methyl-alcohol": "methanol",
    "meg-water": "ethylene-glycol-water",
    "ethylene-glycol": "ethylene-glycol-water",
    "mpg-water": "propylene-glycol-water",
    "propylene-glycol": "propylene-glycol-water",
    "cacl2-water": "calcium-chloride-water",
    "nacl-water": "sodium-chloride-water",
}

MATERIAL_ALIASES = {
    "steel": "carbon-steel",
    "mild-steel": "carbon-steel",
    "304": "stainless-304",
    "stainless-304l": "stainless-304",
    "316": "stainless-316",
    "stainless-316l": "stainless-316",
    "aluminum": "aluminium",
    "dhp-copper": "copper",
    "titanium": "titanium-grade-2",
    "duplex": "duplex-2205",
    "cuni-90-10": "cupronickel-90-10",
    "cuni-70-30": "cupronickel-70-30",
}


def fluid_slug(name: str) -> str:
    """Return the slug a fluid name stands for."""
    return FLUID_ALIASES.get(name, name)


def material_slug(name: str) -> str:
    """Return the slug a material name stands for."""
    return MATERIAL_ALIASES.get(name, name)


def aliases_of(slug: str, table: dict[str, str]) -> list[str]:
    """Return all other words that mean ``slug`` in one of the tables above."""
    return sorted(alias for alias, meant in table.items() if meant == slug)
