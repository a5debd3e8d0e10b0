"""Every row of the tables of hand calculations about integrity and uncertainty, against the functions."""

import importlib
import tomllib
from pathlib import Path
from typing import Any

import numpy as np
import pytest

_HERE = Path(__file__).parent
_TABLES = (
    "integrity_dew_points.toml",
    "integrity_condensate.toml",
    "integrity_walls.toml",
    "uncertainty.toml",
)


def _rows() -> list[Any]:
    rows = []
    for table in _TABLES:
        checks = tomllib.loads((_HERE / table).read_text(encoding="utf-8"))["check"]
        rows += [
            pytest.param(check, id=f"{table.removesuffix('.toml')}-{place}-{check['function']}")
            for place, check in enumerate(checks)
        ]
    return rows


def _as_array(value: Any) -> Any:
    return np.array(value) if isinstance(value, list) else value


@pytest.mark.parametrize("check", _rows())
def test_a_function_gives_the_worked_value(check: dict[str, Any]) -> None:
    """The worked value comes out within its tolerance."""
    module, name = check["function"].split(".")
    function = getattr(importlib.import_module(f"crossbank_service.methods.{module}"), name)
    given = function(**{k: _as_array(v) for k, v in check["inputs"].items()})
    if "attribute" in check:
        given = getattr(given, check["attribute"])
    if "index" in check:
        given = given[check["index"]]
    difference = np.abs(np.asarray(given) - np.array(check["expected"]))
    assert np.all(difference <= np.array(check["absolute"])), (check["source"], given, check["expected"])
