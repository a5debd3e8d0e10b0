"""Banks that the tests of plain-bank methods draw from."""

from typing import Any

import numpy as np
from hypothesis import strategies as st

from crossbank_service.methods import Method, in_role

HEAT = tuple(m for m in in_role("outside_heat_transfer") if "plain" in m.surfaces)
DROP = tuple(m for m in in_role("outside_pressure_drop") if "plain" in m.surfaces)

Quantities = dict[str, Any]


def asked(method: Method, quantities: Quantities) -> Quantities:
    """Pick what a method takes of some quantities."""
    return {name: quantities[name] for name in (*method.inputs, *method.options) if name in quantities}


@st.composite
def any_bank(draw: st.DrawFn) -> Quantities:
    """Anything the nomenclature admits, tubes that overlap included."""
    return {
        "reynolds": draw(st.just(0.0) | st.floats(1e-12, 1e7)),
        "prandtl": draw(st.floats(1e-4, 1e6)),
        "transverse_pitch_ratio": draw(st.floats(1.0, 20.0)),
        "longitudinal_pitch_ratio": draw(st.floats(0.3, 20.0)),
        "arrangement": draw(st.sampled_from([0.0, 1.0])),
        "rows": float(draw(st.integers(1, 500))),
        "prandtl_wall": draw(st.floats(1e-4, 1e6)),
        "temperature_ratio": draw(st.floats(0.05, 20.0)),
        "gas": draw(st.sampled_from([0.0, 1.0])),
        "viscosity_ratio": draw(st.floats(1e-4, 1e4)),
    }


@st.composite
def usual_bank(draw: st.DrawFn, least_rows: int = 1) -> Quantities:
    """Pitches of practice, where tubes have room."""
    staggered = draw(st.booleans())
    a = draw(st.floats(1.25, 3.0))
    if staggered:
        b = draw(st.floats(max(0.7, np.sqrt(1.25**2 - a * a / 4.0) if a < 2.5 else 0.7), min(3.0, 2.0 * a)))
    else:
        b = draw(st.floats(1.2, min(3.0, a / 0.7)))
    return {
        "transverse_pitch_ratio": a,
        "longitudinal_pitch_ratio": b,
        "arrangement": float(staggered),
        "rows": float(draw(st.integers(least_rows, 30))),
    }
