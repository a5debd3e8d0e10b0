"""The heat balance of the cell grid against exact crossflow effectiveness."""

import tomllib
from pathlib import Path

import numpy as np
import pytest
from numpy.typing import NDArray
from tests.unit.rating.bank_requests import Body, bank, body, constant, mass, rated

from crossbank_service.rating._circuit import Circuit
from crossbank_service.rating._door import SEGMENTS_MORE_PASSES, SEGMENTS_ONE_PASS
from crossbank_service.rating._network import Field, solve_known_inside, solve_passes

Floats = NDArray[np.float64]

_EXACT = tomllib.loads(
    (Path(__file__).parents[2] / "reference" / "effectiveness.toml").read_text(encoding="utf-8")
)
_STATES = ((1.0, 0.5), (2.0, 0.5), (2.0, 1.0), (4.0, 0.25))

# counter-cross, tube fluid mixed between passes, rows in blocks, passes alternating in direction, at _STATES:
# the row equations of Pignotti and Cordero, J. Heat Transfer 105 (1983) 584-591, solved apart from the service
_AGAINST = {
    (1, 1): (0.541969, 0.702013, 0.578807, 0.870500),
    (2, 1): (0.546118, 0.724712, 0.604685, 0.918809),
    (3, 1): (0.546881, 0.728985, 0.609938, 0.927437),
    (4, 1): (0.547148, 0.730483, 0.611812, 0.930358),
    (6, 1): (0.547338, 0.731553, 0.613161, 0.932406),
    (2, 2): (0.558315, 0.752307, 0.634701, 0.939606),
    (3, 3): (0.561883, 0.764606, 0.651424, 0.953004),
    (4, 2): (0.558905, 0.756240, 0.640193, 0.947461),
    (4, 4): (0.563112, 0.768887, 0.657768, 0.957151),
    (6, 2): (0.559014, 0.756959, 0.641215, 0.948804),
    (6, 3): (0.562061, 0.765830, 0.653266, 0.955252),
    (6, 6): (0.564011, 0.772051, 0.662625, 0.960011),
    (8, 2): (0.559052, 0.757211, 0.641574, 0.949266),
    (8, 4): (0.563188, 0.769415, 0.658584, 0.958084),
}
# co-cross at NTU 2, C 0.5; the same source
_WITH = {
    (2, 2): 0.640901,
    (3, 3): 0.637384,
    (4, 2): 0.642615,
    (4, 4): 0.635518,
    (6, 3): 0.637850,
    (6, 6): 0.634392,
}


def _even(rows: int, passes: int, *, against: bool = True) -> Circuit:
    return Circuit((rows // passes,) * passes, against)


def _grid(
    ntu: Floats | float,
    ratio: Floats | float,
    circuit: Circuit,
    segments: int,
    ends: tuple[float, float] = (0.0, 1.0),
) -> Field:
    """The grid of cases of constant conductance; ``ratio`` is outside over inside capacity rate."""
    n, c = np.broadcast_arrays(np.atleast_1d(ntu).astype(float), np.atleast_1d(ratio).astype(float))
    shape = (len(n), circuit.rows, segments)

    def spread(values: Floats) -> Floats:
        return np.broadcast_to(values[:, None, None], shape).copy()

    share = np.array([1.0 / circuit.rows_per_pass[p] for p in circuit.pass_of_row])[None, :, None]
    return solve_passes(
        spread(n / (circuit.rows * segments)),
        spread(np.full_like(n, 1.0 / segments)),
        spread(1.0 / c) * share,
        np.full_like(n, ends[0]),
        np.full_like(n, ends[1]),
        np.zeros((len(n), circuit.passes)),
        circuit,
    )


def _effectiveness(*arguments: object, **named: object) -> Floats:
    field = _grid(*arguments, **named)  # type: ignore[arg-type]
    gained: Floats = field.outside_out[:, -1].mean(axis=1)
    return gained


def _default_segments(passes: int) -> int:
    """What a rating takes when the request leaves it open."""
    return SEGMENTS_ONE_PASS if passes == 1 else SEGMENTS_MORE_PASSES


@pytest.mark.parametrize(("rows", "passes"), list(_AGAINST))
def test_counter_cross_banks_at_the_usual_segments(rows: int, passes: int) -> None:
    """With the segments a rating takes by itself the exact effectiveness is met within 1e-4."""
    ntu, ratio = np.array(_STATES).T
    p = _effectiveness(ntu, ratio, _even(rows, passes), _default_segments(passes))
    np.testing.assert_allclose(p, _AGAINST[rows, passes], rtol=0.0, atol=1e-4)


@pytest.mark.parametrize(("rows", "passes"), list(_WITH))
def test_co_cross_banks_at_the_usual_segments(rows: int, passes: int) -> None:
    """The same where the first pass lies in the first rows."""
    p = _effectiveness(2.0, 0.5, _even(rows, passes, against=False), _default_segments(passes))
    assert p[0] == pytest.approx(_WITH[rows, passes], abs=1e-4)


@pytest.mark.parametrize(
    "case",
    [
        case
        for case in _EXACT["case"]
        if case["connection"] == "mixed"
        and case["alternate"]
        and "row_shares" not in case
        and sum(case["rows_per_pass"]) <= 12
        and case["ntu"] <= 8.0
    ],
)
def test_refined_grid_meets_the_row_equations(case: dict[str, object]) -> None:
    """Two refined grids, extrapolated by their second order, meet the 60-digit solution to 2e-6."""
    rows = case["rows_per_pass"]
    assert isinstance(rows, list)
    circuit = Circuit(tuple(rows), bool(case["counter"]))
    ntu, ratio, expected = (float(str(case[name])) for name in ("ntu", "capacity_ratio", "expected"))
    coarse, fine = (_effectiveness(ntu, ratio, circuit, n)[0] for n in (48, 96))
    assert fine + (fine - coarse) / 3.0 == pytest.approx(expected, abs=2e-6)
    assert abs(fine - expected) <= max(abs(coarse - expected), 1e-12)


@pytest.mark.parametrize(
    ("rows", "passes", "exact"), [(4, 1, 0.730483), (4, 2, 0.756240), (4, 4, 0.768887), (6, 3, 0.765830)]
)
def test_error_falls_with_the_square_of_the_segments(rows: int, passes: int, exact: float) -> None:
    """Halving the segments' length quarters the error (the exact values carry six decimals)."""
    circuit = _even(rows, passes)
    errors = [_effectiveness(2.0, 0.5, circuit, n)[0] - exact for n in (4, 8)]
    assert errors[0] / errors[1] == pytest.approx(4.0, abs=0.6)
    best = _effectiveness(2.0, 0.5, circuit, 200)[0]
    assert best == pytest.approx(exact, abs=1.5e-6)


@pytest.mark.parametrize("segments", [1, 3, 8, 50])
@pytest.mark.parametrize("rows", [1, 2, 7])
def test_isothermal_inside_needs_no_segments(rows: int, segments: int) -> None:
    """With one inside temperature every grid gives 1 - exp(-NTU), and so does a grid of endless capacity."""
    ntu = np.array([1e-6, 0.3, 2.0, 9.0, 60.0])
    shape = (len(ntu), rows, segments)
    ua = np.broadcast_to((ntu / (rows * segments))[:, None, None], shape)
    share = np.full(shape, 1.0 / segments)
    field = solve_known_inside(ua, share, np.zeros(len(ntu)), np.ones(shape))
    np.testing.assert_allclose(field.outside_out[:, -1].mean(axis=1), -np.expm1(-ntu), rtol=1e-12)
    np.testing.assert_allclose(field.heat.sum(axis=(1, 2)), -np.expm1(-ntu), rtol=1e-12)
    passing = _effectiveness(ntu, 1e-12, _even(rows, 1), segments)
    np.testing.assert_allclose(passing, -np.expm1(-ntu), rtol=1e-10)


@pytest.mark.parametrize("segments", [1, 2, 16])
def test_one_row_is_exact_in_any_grid(segments: int) -> None:
    """One row is P = (1 - exp(-C(1 - exp(-NTU))))/C whatever the segments."""
    ntu, c = (v.ravel() for v in np.meshgrid([1e-3, 0.5, 3.0, 40.0, 1e3], [1e-6, 0.5, 1.0, 3.0, 50.0]))
    exact = -np.expm1(c * np.expm1(-ntu)) / c
    np.testing.assert_allclose(_effectiveness(ntu, c, _even(1, 1), segments), exact, rtol=1e-9)


@pytest.mark.parametrize("passes", [1, 2, 4])
@pytest.mark.parametrize("against", [True, False])
def test_extreme_numbers_stay_within_the_second_law(passes: int, against: bool) -> None:
    """NTU to 1e3 and C from 1e-6 to 50: finite, balanced, no temperature beyond the two inlets."""
    ntu, c = (v.ravel() for v in np.meshgrid([1e-6, 1.0, 30.0, 1e3], [1e-6, 0.1, 1.0, 7.0, 50.0]))
    circuit = _even(4, passes, against=against)
    field = _grid(ntu, c, circuit, 8)
    for values in (field.outside_in, field.outside_out, field.inside_in, field.inside_out, field.inside_mean):
        assert np.isfinite(values).all()
        assert values.min() >= -1e-9
        assert values.max() <= 1.0 + 1e-9
    p = field.outside_out[:, -1].mean(axis=1)
    assert (p <= np.minimum(1.0, 1.0 / c) * (1.0 + 1e-9)).all()
    np.testing.assert_allclose(field.heat.sum(axis=(1, 2)), p, rtol=1e-9, atol=1e-15)


def test_many_passes_at_great_ntu_approach_counterflow() -> None:
    """Twelve passes of one row against the stream come close to endless counterflow, and with it to cocurrent."""
    ntu, c = 4.0, 0.6
    counter = -np.expm1(-ntu * (1.0 - c)) / (1.0 - c * np.exp(-ntu * (1.0 - c)))
    cocurrent = -np.expm1(-ntu * (1.0 + c)) / (1.0 + c)
    against = _effectiveness(ntu, c, _even(12, 12), 24)[0]
    along = _effectiveness(ntu, c, _even(12, 12, against=False), 24)[0]
    assert counter - 0.01 < against < counter
    assert along == pytest.approx(cocurrent, abs=0.003)


@pytest.mark.parametrize("ends", [(300.0, 360.0), (360.0, 300.0), (300.0, 300.0 + 1e-6)])
def test_sign_and_size_of_the_difference_do_not_matter(ends: tuple[float, float]) -> None:
    """Heating, cooling and a difference of a millionth of a kelvin share one effectiveness."""
    circuit = _even(4, 2)
    unit = _effectiveness(2.0, 0.5, circuit, 8)[0]
    field = _grid(2.0, 0.5, circuit, 8, ends)
    p = float(field.heat.sum()) / (ends[1] - ends[0])
    assert p == pytest.approx(unit, rel=1e-11 if abs(ends[1] - ends[0]) > 1.0 else 1e-6)


@pytest.mark.parametrize(("rows", "passes"), [(1, 1), (4, 1), (4, 2), (4, 4), (6, 3), (8, 4)])
@pytest.mark.parametrize("direction", ["against", "with"])
@pytest.mark.parametrize("hot_inside", [True, False])
def test_whole_rating_of_constant_properties_is_the_exact_effectiveness(
    rows: int, passes: int, direction: str, hot_inside: bool
) -> None:
    """With constant properties and one coefficient a rating finds P(NTU, C) of its own ua_w_k within 1e-4."""
    detail: Body = {}
    metal = {"name": "constant", "conductivity_w_m_k": 50.0}
    part = bank(rows, passes, direction, transverse_pitch_m=0.04, tubes_per_row=30, material=metal)
    ends = (300.0, 360.0) if hot_inside else (360.0, 300.0)
    gas = constant(1.2, 1005.0, 0.026, 1.8e-5, gas=True)
    inside = {
        "kind": "single-phase",
        "fluid": constant(1000.0, 4180.0, 0.6, 8e-4),
        "flow_kg_s": 0.4,
        "inlet_temperature_k": ends[1],
        "inlet_pressure_pa": 5e5,
    }
    outside = {"fluid": gas, "flow": mass(1.0), "inlet_temperature_k": ends[0]}
    # one coefficient for all rows, and no wall factor of any kind
    found = rated(body(part, inside, outside, detail, {"outside_heat_transfer": "churchill-bernstein-1977"}))
    c_out, c_in = 1.0 * 1005.0, 0.4 * 4180.0
    assert found.overall.ua_w_k is not None
    circuit = _even(rows, passes, against=direction == "against")
    coarse, fine = (
        _effectiveness(found.overall.ua_w_k / c_out, c_out / c_in, circuit, n)[0] for n in (96, 192)
    )
    exact = fine + (fine - coarse) / 3.0
    p = (found.outside.outlet_temperature_k - ends[0]) / (ends[1] - ends[0])
    assert p == pytest.approx(exact, abs=1e-4)
    lumped = rated(
        body(
            part,
            inside,
            outside,
            {"resolution": "bank"},
            {"outside_heat_transfer": "churchill-bernstein-1977"},
        )
    )
    assert lumped.duty_w == pytest.approx(found.duty_w, rel=2e-4)
    assert lumped.overall.ua_w_k == pytest.approx(found.overall.ua_w_k, rel=1e-9)
