"""Plain-bank methods against the independent library ht, where its functions are sound."""

from typing import Any

import numpy as np
import pytest
from ht import conv_tube_bank
from ht.conv_external import Nu_cylinder_Churchill_Bernstein
from scipy.interpolate import bisplev

from crossbank_service.methods import method

HEAT = "outside_heat_transfer"
ESDU = method(HEAT, "esdu-73031")
GNIELINSKI = method(HEAT, "gnielinski-1979")
CYLINDER = method(HEAT, "churchill-bernstein-1977")
ULINSKAS = method("outside_pressure_drop", "zukauskas-ulinskas-1988")


@pytest.mark.parametrize("staggered", [False, True])
@pytest.mark.parametrize("rows", [3, 6, 12])
@pytest.mark.parametrize("reynolds", [100.0, 2e4, 5e5])
def test_esdu_equals_the_library(staggered: bool, rows: int, reynolds: float) -> None:
    """The library tells the arrangement by the pitches, equal in line, unequal staggered."""
    expected = conv_tube_bank.Nu_ESDU_73031(
        Re=reynolds,
        Pr=4.0,
        tube_rows=rows,
        pitch_parallel=0.05 if not staggered else 0.04,
        pitch_normal=0.05,
        Pr_wall=3.0,
    )
    value = ESDU.function(
        reynolds=reynolds, prandtl=4.0, prandtl_wall=3.0, arrangement=float(staggered), rows=float(rows)
    )
    assert float(value) == pytest.approx(expected, rel=1e-12)


@pytest.mark.parametrize(("a", "b", "staggered"), [(2.0, 2.0, False), (1.5, 1.3, True), (2.5, 1.6, True)])
@pytest.mark.parametrize("rows", [4, 10])
def test_gnielinski_equals_the_library_on_its_own_length_and_velocity(
    a: float, b: float, staggered: bool, rows: int
) -> None:
    """The library wants Re on pi d/2 with the empty duct's velocity and gives Nu on that length."""
    d = 0.025
    own = 3e4
    expected = conv_tube_bank.Nu_HEDH_tube_bank(
        Re=own, Pr=0.7, Do=d, tube_rows=rows, pitch_parallel=b * d, pitch_normal=a * d
    )
    value: Any = GNIELINSKI.function(
        reynolds=own / (0.5 * np.pi) / ((a - 1.0) / a),
        prandtl=0.7,
        transverse_pitch_ratio=a,
        longitudinal_pitch_ratio=b,
        arrangement=float(staggered),
        rows=float(rows),
    )
    assert float(value) * 0.5 * np.pi == pytest.approx(expected, rel=1e-12)


@pytest.mark.parametrize("reynolds", [10.0, 3e3, 2e5, 2e6])
def test_single_cylinder_equals_the_library(reynolds: float) -> None:
    """In an in-line bank of pitch two the approach has half the Reynolds number of the gap."""
    value = CYLINDER.function(
        reynolds=2.0 * reynolds,
        prandtl=0.7,
        transverse_pitch_ratio=2.0,
        longitudinal_pitch_ratio=2.0,
        arrangement=0.0,
    )
    assert float(value) == pytest.approx(Nu_cylinder_Churchill_Bernstein(reynolds, 0.7), rel=1e-12)


@pytest.mark.parametrize("pitch", [1.25, 1.5, 2.0, 2.5])
@pytest.mark.parametrize("reynolds", [3e3, 1e4, 3e4, 1e5])
@pytest.mark.parametrize("staggered", [False, True])
def test_euler_fits_follow_the_digitised_charts(pitch: float, reynolds: float, staggered: bool) -> None:
    """Curves read from the Zukauskas charts and fits of the same charts agree within 20 %."""
    if staggered:
        curves = conv_tube_bank.dP_staggered_f_tck
        b = pitch * np.sqrt(3.0) / 2.0
    else:
        curves = conv_tube_bank.dP_inline_f_tck
        b = pitch
    chart = float(bisplev(np.array([reynolds]), np.array([pitch]), curves))
    value = ULINSKAS.function(
        reynolds=reynolds,
        transverse_pitch_ratio=pitch,
        longitudinal_pitch_ratio=b,
        arrangement=float(staggered),
        rows=10.0,
    )
    assert float(value) == pytest.approx(chart, rel=0.20)
