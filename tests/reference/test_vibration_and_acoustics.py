"""Every check value of ``vibration.toml`` and ``acoustics.toml``, to the digits printed."""

import importlib
import inspect
import tomllib
from pathlib import Path
from typing import Any

import numpy as np
import pytest

_HERE = Path(__file__).parent
_FILES = ("vibration.toml", "acoustics.toml")
_CASES = [case for name in _FILES for case in tomllib.loads((_HERE / name).read_text("utf-8"))["case"]]


def _evaluate(case: dict[str, Any], copies: int) -> np.ndarray:
    module, function = case["function"].split(".")
    law = getattr(importlib.import_module(f"crossbank_service.methods.{module}"), function)
    inputs = {
        key: value if key == "unevenness" else np.full(copies, value) for key, value in case["inputs"].items()
    }
    keyword = all(p.kind is p.KEYWORD_ONLY for p in inspect.signature(law).parameters.values())
    result = law(**inputs) if keyword else law(*inputs.values())
    return np.asarray(getattr(result, case["member"]) if "member" in case else result)


@pytest.mark.parametrize("case", _CASES, ids=[case["name"] for case in _CASES])
def test_check_value_is_met_to_its_digits(case: dict[str, Any]) -> None:
    """A value calculated elsewhere comes out to half a unit of its last digit, alone and beside others."""
    alone, beside = _evaluate(case, 1), _evaluate(case, 7)
    assert alone[0] == pytest.approx(case["expected"], rel=0.0, abs=case["within"])
    assert np.all(beside == alone[0])
