"""Reference values of the methods for flow inside tubes and of the effectiveness relations."""

import inspect
import tomllib
from collections.abc import Callable, Iterator
from pathlib import Path
from typing import Any

import numpy as np
import pytest

from crossbank_service.methods import effectiveness as relations
from crossbank_service.methods import inside_condensing, inside_single_phase, inside_two_phase_drop

_HERE = Path(__file__).parent
_INSIDE = tomllib.loads((_HERE / "inside.toml").read_text(encoding="utf-8"))
_BANKS = tomllib.loads((_HERE / "effectiveness.toml").read_text(encoding="utf-8"))


def _function(name: str) -> Callable[..., Any]:
    for module in (inside_single_phase, inside_condensing, inside_two_phase_drop):
        if hasattr(module, name):
            found: Callable[..., Any] = getattr(module, name)
            return found
    raise LookupError(name)


def _inside_cases() -> Iterator[Any]:
    for group in _INSIDE["group"]:
        for index, case in enumerate(group["cases"]):
            yield pytest.param(group, case, id=f"{group['function']}-{index}")


@pytest.mark.parametrize(("group", "case"), list(_inside_cases()))
def test_inside_method_gives_its_reference_value(group: dict[str, Any], case: dict[str, Any]) -> None:
    """Each method reproduces the published equations' value to the printed digits."""
    function = _function(group["function"])
    state = _INSIDE["state"][group["state"]] if "state" in group else {}
    accepted = inspect.signature(function).parameters
    arguments = {name: value for name, value in state.items() if name in accepted} | case["arguments"]
    value = float(function(**arguments))
    assert value == pytest.approx(case["expected"], rel=group["relative_tolerance"])


@pytest.mark.parametrize("case", _BANKS["case"])
def test_bank_effectiveness_agrees_with_sixty_digits(case: dict[str, Any]) -> None:
    """Any rows and passes agree with the matrix exponential at 60 digits."""
    shares = case.get("row_shares")
    circuit = relations.Circuit(
        tuple(case["rows_per_pass"]),
        case["counter"],
        case["connection"],
        case["alternate"],
        None if shares is None else tuple(shares),
    )
    p = float(relations.circuit_effectiveness(case["ntu"], case["capacity_ratio"], circuit))
    assert p == pytest.approx(case["expected"], rel=_BANKS["relative_tolerance"])


def test_momentum_flux_of_full_and_partial_condensation() -> None:
    """Steam at 3 bar and 120 kg/(m2 s): the full change is G^2 (1/r_l - 1/r_g), by hand."""
    state = _INSIDE["state"]["steam-3-bar"]
    common = {
        "mass_flux_kg_m2_s": 120.0,
        "liquid_density_kg_m3": state["liquid_density_kg_m3"],
        "vapour_density_kg_m3": state["vapour_density_kg_m3"],
    }
    quality = np.array([1.0, 0.0, 0.9, 0.1])
    void = inside_two_phase_drop.rouhani_axelsson_void(
        quality=quality, surface_tension_n_m=state["surface_tension_n_m"], **common
    )
    flux = inside_two_phase_drop.momentum_flux(quality=quality, void_fraction=void, **common)
    assert float(flux[1] - flux[0]) == pytest.approx(120.0**2 * (1.0 / 931.818 - 1.0 / 1.65082), rel=1e-12)
    # 0.9 to 0.1 with the drift-flux void fraction, evaluated by a program of its own
    assert float(flux[3] - flux[2]) == pytest.approx(-6969.0, abs=0.06)
