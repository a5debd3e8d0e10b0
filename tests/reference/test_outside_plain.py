"""Plain-bank methods against values worked by hand and values of an independent decimal writing."""

import tomllib
from decimal import Decimal
from pathlib import Path
from typing import Any

import numpy as np
import pytest

from crossbank_service.methods import by_slug, method

HERE = Path(__file__).parent


def _load(name: str) -> dict[str, Any]:
    return tomllib.loads((HERE / name).read_text(encoding="utf-8"))


WORKED = _load("outside_plain_worked.toml")
PRECISE = _load("outside_plain_precise.toml")


def _name(case: dict[str, Any]) -> str:
    return f"{case['method']}-Re{case['inputs']['reynolds']:g}"


@pytest.mark.parametrize("case", WORKED["case"], ids=_name)
def test_value_worked_by_hand_is_met_to_the_digits_printed(case: dict[str, Any]) -> None:
    """Half a unit of the last digit printed is all that may differ."""
    printed = Decimal(case["printed"])
    exponent = printed.as_tuple().exponent
    assert isinstance(exponent, int)
    (record,) = by_slug(case["method"])
    value = float(record.function(**case["inputs"]))
    assert abs(value - float(printed)) <= 0.505 * 10.0**exponent


@pytest.mark.parametrize("case", PRECISE["case"], ids=_name)
def test_value_of_the_decimal_writing_is_met(case: dict[str, Any]) -> None:
    """Two writings of one formula agree to rounding."""
    record = method(case["role"], case["method"])
    value = float(record.function(**case["inputs"]))
    assert value == pytest.approx(case["expected"], rel=PRECISE["relative_tolerance"])


def test_every_plain_single_law_has_a_reference_value() -> None:
    """No published law stands without a number from outside."""
    covered = {case["method"] for case in [*WORKED["case"], *PRECISE["case"]]}
    assert covered == {
        "gnielinski-1979",
        "zukauskas-1987",
        "esdu-73031",
        "grimison-1937",
        "khan-2006",
        "churchill-bernstein-1977",
        "gaddis-gnielinski-1985",
        "zukauskas-ulinskas-1988",
        "jakob-1938",
        "gunter-shaw-1945",
    }


def _coefficient(bank: dict[str, float], *, pr: float, k: float, d: float, **wall: float) -> float:
    record = method("outside_heat_transfer", "gnielinski-1979")
    return float(record.function(prandtl=pr, **bank, **wall)) * k / d


def test_gnielinski_coefficients_from_velocities_and_diameters() -> None:
    """Worked by hand from VDI Heat Atlas G7: W/(m2 K) of three banks given in metres and m/s."""
    inline = {
        "transverse_pitch_ratio": 2.0,
        "longitudinal_pitch_ratio": 2.0,
        "arrangement": 0.0,
        "rows": 10.0,
    }
    inline["reynolds"] = 5.0 / 0.5 * 0.025 / 1.8e-5
    assert _coefficient(inline, pr=0.7, k=0.027, d=0.025) == pytest.approx(106.207, abs=6e-4)

    liquid = {"transverse_pitch_ratio": 1.5, "longitudinal_pitch_ratio": 1.3, "arrangement": 1.0, "rows": 4.0}
    liquid["reynolds"] = 0.3 / (0.5 / 1.5) * 0.02 / 5e-7
    assert _coefficient(liquid, pr=3.0, k=0.65, d=0.02, prandtl_wall=4.0) == pytest.approx(9316.25, abs=6e-3)

    flat = {"transverse_pitch_ratio": 2.5, "longitudinal_pitch_ratio": 0.8, "arrangement": 1.0, "rows": 10.0}
    sigma = 2.0 * (np.hypot(1.25, 0.8) - 1.0) / 2.5
    flat["reynolds"] = 6.0 / sigma * 0.03 / 4e-5
    assert _coefficient(flat, pr=0.69, k=0.04, d=0.03) == pytest.approx(133.891, abs=6e-4)


def test_textbook_air_heater_is_met_within_its_rounding() -> None:
    """Incropera & DeWitt, staggered bank of seven rows in air (from memory): Re 13943, Nu 87.9.

    The book rounds the constant 0.3437 to 0.34 and the Prandtl numbers to two digits: 1.5 % covers it.
    """
    record = method("outside_heat_transfer", "zukauskas-1987")
    value = float(
        record.function(
            reynolds=13943.0,
            prandtl=0.71,
            prandtl_wall=0.70,
            transverse_pitch_ratio=31.3 / 16.4,
            longitudinal_pitch_ratio=34.3 / 16.4,
            arrangement=1.0,
            rows=7.0,
        )
    )
    assert value == pytest.approx(87.9, rel=0.015)
