"""Runs the cases of ``finned.toml``: each says what it expects, how closely, why, and where that is from."""

import tomllib
from pathlib import Path
from typing import Any

import pytest

from crossbank_service.methods import finned_annular, finned_plate, finned_serrated

_METHODS = {
    (record.role, record.slug): record
    for module in (finned_annular, finned_plate, finned_serrated)
    for record in module.RECORDS
}
_CASES: list[dict[str, Any]] = tomllib.loads(Path(__file__).with_name("finned.toml").read_text("utf-8"))[
    "case"
]


@pytest.mark.parametrize("case", _CASES, ids=lambda case: case["name"])
def test_method_gives_the_reference_value(case: dict[str, Any]) -> None:
    """The method of the case gives its value within the tolerance the case justifies."""
    inputs = dict(case["inputs"])
    if "fin_pitch_per_m" in inputs:
        inputs["fin_pitch_m"] = 1.0 / inputs.pop("fin_pitch_per_m")
    given = float(_METHODS[case["role"], case["method"]].function(**inputs))
    assert given == pytest.approx(case["expected"], abs=case["absolute_tolerance"], rel=0.0), case["why"]


def test_every_finned_method_has_a_reference_case() -> None:
    """No finned correlation goes without a reference value, but blends, judged by their parents, and sums."""
    covered = {(case["role"], case["method"]) for case in _CASES}
    own_tests = {
        ("outside_heat_transfer", "briggs-young-low-reynolds-blend"),
        ("outside_pressure_drop", "esdu-86022"),
        ("outside_pressure_drop", "esdu-84016"),
    }
    assert set(_METHODS) == covered | own_tests
