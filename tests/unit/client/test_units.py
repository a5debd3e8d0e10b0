"""Units for people: published conversion factors, and that every system covers every kind."""

import pytest

from crossbank.units import SYSTEMS, Unit


@pytest.mark.parametrize(
    ("system", "kind", "si", "shown"),
    [
        # NIST SP 811 appendix B.8 and B.9: °C = K - 273.15, °F = 1.8 K - 459.67
        ("metric", "temperature", 373.15, 100.0),
        ("us", "temperature", 373.15, 212.0),
        ("us", "temperature", 273.15, 32.0),
        ("us", "difference", 10.0, 18.0),
        # the factors of NIST SP 811 appendix B.8, as SI value of one unit
        ("us", "pressure", 6894.757, 1.0),
        ("us", "draught", 249.0889, 1.0),
        ("us", "heat", 0.2930711, 1.0),
        ("us", "coefficient", 5.678263, 1.0),
        ("us", "mass-flow", 1.259979e-4, 1.0),
        ("us", "density", 16.01846, 1.0),
        ("us", "area", 0.09290304, 1.0),
        ("us", "volume", 0.02831685, 1.0),
        ("us", "velocity", 0.00508, 1.0),
        ("us", "power", 745.6999, 1.0),
        ("us", "small-length", 0.0254, 1.0),
        # W/K per Btu/(h °F): 0.2930711 W over 5/9 K
        ("us", "conductance", 0.5275279, 1.0),
        # kg/(m2 s) per lb/(h ft2): 1.259979e-4 kg/s over 0.09290304 m2
        ("us", "mass-flux", 1.356230e-3, 1.0),
        ("metric", "pressure", 101325.0, 101.325),
        ("metric", "heat", 2500.0, 2.5),
        ("metric", "small-length", 0.0254, 25.4),
        ("metric", "volume", 0.002, 2.0),
        ("metric", "conductance", 1500.0, 1.5),
        ("si", "temperature", 300.0, 300.0),
        ("si", "percent", 0.15, 15.0),
    ],
)
def test_a_number_reads_as_published_factors_say(system: str, kind: str, si: float, shown: float) -> None:
    """Conversions reproduce the published factors to their seven digits."""
    assert SYSTEMS[system][kind].of(si) == pytest.approx(shown, rel=2e-6)


def test_every_system_has_every_kind() -> None:
    """A report can be written in any system."""
    kinds = set(SYSTEMS["si"])
    assert all(set(units) == kinds for units in SYSTEMS.values())


def test_text_keeps_small_numbers_and_says_when_there_is_none() -> None:
    """A small number is not rounded to nothing; null is a dash."""
    unit = Unit("m", decimals=2)
    assert [unit.text(v) for v in (1.234, 0.0, 0.00012, None)] == ["1.23", "0.00", "1.20e-04", "–"]
