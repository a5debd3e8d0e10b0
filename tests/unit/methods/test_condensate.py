"""Condensate: stall, head and its remedies, back-flow between rows, pitch of the tubes."""

import numpy as np
import pytest
from iapws.iapws97 import _PSat_T, _TSat_P

from crossbank_service.methods import condensate
from crossbank_service.methods.criterion import BEYOND, NEAR, NO, UNASSESSED, UNKNOWN, WITHIN, YES


def test_the_coil_sits_at_the_back_pressure_when_it_stalls() -> None:
    """At the stall air temperature the steam temperature is the saturation temperature of the return."""
    back = np.array([360.0, 373.0, 380.0])
    air = condensate.stall_air_temperature_k(310.0, 0.45, back)
    np.testing.assert_allclose(condensate.steam_temperature_at_load_k(air, 310.0, 0.45), back, rtol=1e-14)


def test_a_mild_day_puts_the_coil_under_vacuum() -> None:
    """0 C on and 30 C off at effectiveness 0.4 needs steam of 75 C, 38.595 kPa by IAPWS-IF97."""
    steam = condensate.steam_temperature_at_load_k(273.15, 303.15, 0.4)
    pressure = _PSat_T(float(steam)) * 1e6
    assert pressure == pytest.approx(38595.0, abs=0.5)
    assert condensate.HEAD.grade(condensate.draining_head_pa(pressure, 101325.0, 975.0)) == BEYOND


def test_stall_load_and_stall_temperature_tell_the_same_story() -> None:
    """The straight-line chart (air on varies) and the effectiveness relation agree."""
    full, out, air_in = 433.15, 313.15, 273.15
    effectiveness = (out - air_in) / (full - air_in)
    back = _TSat_P(0.101325)
    load = condensate.stall_load(full, back, out)
    by_load = out - load * (out - air_in)
    assert by_load == pytest.approx(
        float(condensate.stall_air_temperature_k(out, effectiveness, back)), abs=1e-9
    )


def test_stall_load_stays_between_none_and_full() -> None:
    """A return hotter than the steam stalls always, one colder than the pivot never."""
    load = condensate.stall_load(np.array([420.0, 420.0, 300.0]), np.array([430.0, 300.0, 300.0]), 310.0)
    assert load.tolist() == [1.0, 0.0, 1.0]


def test_each_remedy_leaves_the_wanted_head() -> None:
    """Return pressure, drain leg and coil pressure that would do, put back, leave 10 kPa."""
    case: dict[str, float] = {
        "return_pressure_pa": 150e3,
        "liquid_density_kg_m3": 950.0,
        "lift_m": 3.0,
        "leg_m": 0.4,
    }
    head = condensate.draining_head_pa(140e3, trap_pressure_drop_pa=5e3, **case)
    assert condensate.HEAD.grade(head) == BEYOND
    lower = float(condensate.return_pressure_for_head_pa(head, 150e3))
    deeper = float(condensate.leg_for_head_m(head, 0.4, 950.0))
    hotter = condensate.steam_pressure_for_head_pa(head, 140e3)
    again = (
        condensate.draining_head_pa(
            140e3, trap_pressure_drop_pa=5e3, **{**case, "return_pressure_pa": lower}
        ),
        condensate.draining_head_pa(140e3, trap_pressure_drop_pa=5e3, **{**case, "leg_m": deeper}),
        condensate.draining_head_pa(hotter, trap_pressure_drop_pa=5e3, **case),
    )
    np.testing.assert_allclose(again, 10e3, rtol=1e-10)


def test_back_flow_has_a_closed_form_without_orifices() -> None:
    """Share x = 1/2 + sinh(arcsinh(2 r^2)/3) solves the cubic."""
    ratio = np.linspace(0.0, 1.0, 41)
    closed = 0.5 + np.sinh(np.arcsinh(2.0 * ratio**2) / 3.0)
    np.testing.assert_allclose(condensate.front_fed_share(ratio), closed, atol=1e-14)


def test_equal_orifices_do_not_stop_the_back_flow() -> None:
    """With ever larger equal orifices the front-fed share tends to the flow ratio itself."""
    share = condensate.front_fed_share(0.8, np.array([0.0, 1.0, 1e6]), np.array([0.0, 1.0, 1e6]))
    assert share[0] == pytest.approx(0.8629, abs=5e-5)
    assert share[2] == pytest.approx(0.8, abs=1e-5)


def test_orifices_sized_row_by_row_stop_it() -> None:
    """The remedy's loss, over a third of the friction, brings the front-fed share to one."""
    ratio, friction = np.array([0.9, 0.7, 0.5]), 12.0
    loss = condensate.row_orifice_loss(ratio, friction)
    np.testing.assert_allclose(
        condensate.front_fed_share(ratio, 0.0, loss / (friction / 3.0)), 1.0, atol=1e-9
    )


def test_the_ratio_is_least_over_most_of_the_rows() -> None:
    """Rows on the last axis; a bank that condenses nothing has no back-flow."""
    flow = np.array([[0.4, 0.3, 0.2], [0.0, 0.0, 0.0]])
    assert condensate.least_over_most(flow).tolist() == [0.5, 1.0]


@pytest.mark.parametrize(
    ("ratio", "cured", "air", "rows", "expected"),
    [
        (0.95, NO, 280.0, 3, WITHIN),
        (0.80, NO, 280.0, 3, NEAR),
        (0.60, NO, 280.0, 3, BEYOND),
        (0.95, NO, 270.0, 3, NEAR),
        (0.80, NO, 270.0, 3, BEYOND),
        (0.60, NO, 270.0, 3, BEYOND),
        (0.60, YES, 270.0, 3, WITHIN),
        (0.60, NO, 270.0, 1, WITHIN),
        (0.80, UNKNOWN, 280.0, 3, UNASSESSED),
        (0.95, UNKNOWN, 280.0, 3, WITHIN),
        (0.95, UNKNOWN, 270.0, 3, UNASSESSED),
        (np.nan, NO, 280.0, 3, UNASSESSED),
    ],
)
def test_back_flow_is_graded_by_ratio_arrangement_and_cold(
    ratio: float, cured: int, air: float, rows: int, expected: int
) -> None:
    """One step worse in the cold; cured or single rows within; unknown unassessed unless it cannot matter."""
    assert condensate.grade_back_flow(ratio, cured, air, rows) == expected


def test_a_tube_drains_only_where_it_is_steeper_than_its_sag() -> None:
    """1:100 within, 1:250 near, and never with a pool behind a support."""
    codes = condensate.grade_slope(np.array([0.01, 0.005, 0.003, 0.01]), np.array([0.0, 0.0, 0.0, 0.012]))
    assert codes.tolist() == [WITHIN, NEAR, BEYOND, BEYOND]
