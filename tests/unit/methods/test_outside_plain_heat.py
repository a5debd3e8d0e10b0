"""Outside heat transfer of plain banks: behaviour over the whole range."""

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st
from tests.unit.methods.outside_plain_banks import HEAT, Quantities, any_bank, asked, usual_bank

from crossbank_service.methods import Method, auto_outside_heat_transfer, in_range, method

ROLE = "outside_heat_transfer"
GAS = method(ROLE, "gnielinski-zukauskas-gas")
LIQUID = method(ROLE, "gnielinski-zukauskas-liquid")
ZUKAUSKAS = method(ROLE, "zukauskas-1987")
GNIELINSKI = method(ROLE, "gnielinski-1979")
ESDU = method(ROLE, "esdu-73031")
GRIMISON = method(ROLE, "grimison-1937")
WITH_ROWS = tuple(m for m in HEAT if m.row_share is not None)
SWEEP = np.exp(np.linspace(np.log(1e-3), np.log(1e7), 3000))
SQUARE: Quantities = {
    "transverse_pitch_ratio": 2.0,
    "longitudinal_pitch_ratio": 2.0,
    "arrangement": 0.0,
    "rows": 10.0,
}
TRIANGLE: Quantities = {
    "transverse_pitch_ratio": 1.5,
    "longitudinal_pitch_ratio": 1.3,
    "arrangement": 1.0,
    "rows": 10.0,
}


def _slug(record: Method) -> str:
    return record.slug


@pytest.mark.parametrize("record", HEAT, ids=_slug)
@given(bank=any_bank())
def test_nusselt_number_is_finite_and_positive_for_whatever_is_asked(
    record: Method, bank: Quantities
) -> None:
    """From standing fluid to Re 1e7, pitches that no tubes can have included, without a numpy warning."""
    value = float(record.function(**asked(record, bank)))
    assert np.isfinite(value)
    assert value > 0.0


@pytest.mark.parametrize("record", HEAT, ids=_slug)
@given(bank=usual_bank(), prandtl=st.floats(0.66, 300.0))
def test_nusselt_number_has_no_jump_over_the_reynolds_number(
    record: Method, bank: Quantities, prandtl: float
) -> None:
    """A step of 1e-4 in Re never moves Nu by more than three times that, joins included."""
    quantities = {**bank, "prandtl": prandtl}
    here = record.function(**asked(record, {**quantities, "reynolds": SWEEP}))
    beside = record.function(**asked(record, {**quantities, "reynolds": SWEEP * 1.0001}))
    assert np.abs(beside / here - 1.0).max() < 3e-4


@pytest.mark.parametrize("record", HEAT, ids=_slug)
@given(bank=usual_bank(least_rows=4), prandtl=st.floats(0.66, 300.0))
def test_nusselt_number_rises_with_the_reynolds_number(
    record: Method, bank: Quantities, prandtl: float
) -> None:
    """Four rows and more; on fewer the published row tables step down at Re 1000 faster than Nu rises."""
    if record is GAS:
        prandtl = min(prandtl, 1.1)
    value = record.function(**asked(record, {**bank, "prandtl": prandtl, "reynolds": SWEEP}))
    assert (np.diff(value) > 0.0).all()


@pytest.mark.parametrize("record", WITH_ROWS, ids=_slug)
@given(bank=usual_bank(), prandtl=st.floats(0.66, 300.0), reynolds=st.floats(1.0, 1e6))
def test_row_shares_have_the_mean_one(
    record: Method, bank: Quantities, prandtl: float, reynolds: float
) -> None:
    """Local over mean coefficient, averaged over the rows, is one to rounding."""
    assert record.row_share is not None
    rows = np.arange(1.0, bank["rows"] + 1.0)
    quantities = asked(record, {**bank, "prandtl": prandtl, "reynolds": reynolds})
    shares = record.row_share(row=rows, **quantities)
    assert shares.mean() == pytest.approx(1.0, rel=1e-13)
    assert (shares > 0.0).all()


@pytest.mark.parametrize("record", HEAT, ids=_slug)
def test_a_case_gives_the_same_bits_alone_and_among_others(record: Method) -> None:
    """Seven hundred mixed cases at once against each one alone, arrays and plain numbers."""
    rng = np.random.default_rng(5)
    n = 700
    quantities = {
        "reynolds": np.exp(rng.uniform(0.0, 15.0, n)),
        "prandtl": np.exp(rng.uniform(-0.4, 6.0, n)),
        "transverse_pitch_ratio": rng.uniform(1.2, 3.5, n),
        "longitudinal_pitch_ratio": rng.uniform(0.8, 3.5, n),
        "arrangement": rng.integers(0, 2, n).astype(float),
        "rows": rng.integers(1, 25, n).astype(float),
    }
    inputs = asked(record, quantities)
    together = record.function(**inputs)
    alone = [float(record.function(**{k: float(v[i]) for k, v in inputs.items()})) for i in range(n)]
    assert together.tolist() == alone


def test_case_axis_broadcasts_against_row_axis() -> None:
    """Cases down, rows across: the shape of the result is that of all arguments together."""
    reynolds = np.full((3, 5), 2e4)
    pitches = np.array([[1.5], [2.0], [2.5]])
    value = ZUKAUSKAS.function(
        **{**SQUARE, "prandtl": 0.7, "reynolds": reynolds, "transverse_pitch_ratio": pitches}
    )
    assert value.shape == (3, 5)
    assert ESDU.function(reynolds=2e4, prandtl=0.7, arrangement=0.0, rows=6.0).shape == ()


def test_zukauskas_local_rows_are_the_differences_of_the_table() -> None:
    """By hand from the 1987 table: rows 1 to 8 over the deep bank."""
    assert ZUKAUSKAS.row_share is not None
    rows = np.arange(1.0, 9.0)
    inline = ZUKAUSKAS.row_share(row=rows, reynolds=1e4, **{**SQUARE, "rows": 20.0})
    staggered = ZUKAUSKAS.row_share(row=rows, reynolds=1e4, **{**TRIANGLE, "rows": 20.0})
    assert inline == pytest.approx([0.70, 0.90, 0.98, 1.02, 1.00, 1.01, 1.04, 1.0033], abs=5e-5)
    assert staggered == pytest.approx([0.64, 0.88, 1.00, 1.04, 1.04, 1.01, 1.04, 1.0033], abs=5e-5)


def test_slow_staggered_banks_take_their_own_row_table() -> None:
    """By the 1972 figure: one row of a staggered bank below Re 1000 has 0.83 of the deep bank, not 0.64."""
    deep = {**TRIANGLE, "prandtl": 0.7, "reynolds": 300.0, "rows": 20.0}
    ratio = float(ZUKAUSKAS.function(**{**deep, "rows": 1.0})) / float(ZUKAUSKAS.function(**deep))
    assert ratio == pytest.approx(0.83, rel=1e-12)


def test_zukauskas_passes_each_join_through_the_geometric_mean() -> None:
    """At the join the smooth passage has both laws by half: in-line Re 1000, by hand from the constants."""
    value = float(ZUKAUSKAS.function(**{**SQUARE, "rows": 20.0, "prandtl": 0.7, "reynolds": 1e3}))
    slow, fast = 0.52 * 1e3**0.5, 0.27 * 1e3**0.63
    assert value == pytest.approx(np.sqrt(slow * fast) * 0.7**0.36, rel=1e-12)


def test_esdu_one_and_two_rows_follow_the_zukauskas_ratio() -> None:
    """By the convention: F2(3) times C_N/C_3."""
    bank = {"reynolds": 2e4, "prandtl": 0.7, "arrangement": 0.0}
    deep = float(ESDU.function(**bank, rows=10.0))
    assert float(ESDU.function(**bank, rows=1.0)) / deep == pytest.approx(0.8479 * 0.70 / 0.86, rel=1e-12)
    assert float(ESDU.function(**bank, rows=2.0)) / deep == pytest.approx(0.8479 * 0.80 / 0.86, rel=1e-12)


def test_gnielinski_first_row_of_a_short_bank_is_a_single_row() -> None:
    """Local coefficient of row 1 equals the bank of one row; the others carry the arrangement factor."""
    assert GNIELINSKI.row_share is not None
    bank = {**TRIANGLE, "prandtl": 0.7, "reynolds": 2e4, "rows": 6.0}
    mean = float(GNIELINSKI.function(**bank))
    local = mean * GNIELINSKI.row_share(row=np.array([1.0, 2.0, 6.0]), **bank)
    # one row alone of a bank whose narrowest gap lies across the flow, as here
    single = float(GNIELINSKI.function(**{**bank, "rows": 1.0}))
    assert local[0] == pytest.approx(single, rel=1e-12)
    assert local[1:] == pytest.approx(np.full(2, single * (1.0 + 2.0 / 3.9)), rel=1e-12)


def test_wall_factors_of_gnielinski_follow_phase_and_direction() -> None:
    """By hand: liquids 0.25 heated and 0.11 cooled; gases (T/T_w)^0.12 heated and 1 cooled."""
    bank = {**SQUARE, "prandtl": 4.0, "reynolds": 2e4}
    plain = float(GNIELINSKI.function(**bank))

    def factor(**wall: float) -> float:
        return float(GNIELINSKI.function(**bank, **wall)) / plain

    assert factor(prandtl_wall=2.0) == pytest.approx(2.0**0.25, rel=1e-12)
    assert factor(prandtl_wall=8.0) == pytest.approx(0.5**0.11, rel=1e-12)
    assert factor(gas=1.0, temperature_ratio=0.8, prandtl_wall=2.0) == pytest.approx(0.8**0.12, rel=1e-12)
    assert factor(gas=1.0, temperature_ratio=1.3, prandtl_wall=2.0) == pytest.approx(1.0, rel=1e-15)


def test_grimison_is_held_at_the_nearest_pitches_and_says_so() -> None:
    """Outside the nodes' hull the nearest point of it: in-line 4 x 2 answers as 3 x 2, out of range."""
    outside = {**SQUARE, "transverse_pitch_ratio": 4.0, "prandtl": 0.7, "reynolds": 1e4}
    held = float(GRIMISON.function(**outside))
    assert held == pytest.approx(
        float(GRIMISON.function(**{**outside, "transverse_pitch_ratio": 3.0})), rel=1e-12
    )
    within, notes = in_range(GRIMISON, outside)
    assert not within
    assert "distance of the pitch ratios" in (notes[0] or "")


def test_grimison_meets_its_sparse_nodes() -> None:
    """Staggered 2 x 0.9 is a node of the table: 1.13 x 0.446 Re^0.571 Pr^(1/3), by hand."""
    bank = {"transverse_pitch_ratio": 2.0, "longitudinal_pitch_ratio": 0.9, "arrangement": 1.0, "rows": 10.0}
    value = float(GRIMISON.function(**bank, prandtl=0.7, reynolds=1e4))
    assert value == pytest.approx(1.13 * 0.446 * 1e4**0.571 * 0.7 ** (1.0 / 3.0), rel=1e-12)


@given(a=st.floats(1.25, 3.0), b=st.floats(0.6, 3.0), step=st.floats(-1e-7, 1e-7))
def test_grimison_has_no_jump_over_the_pitches(a: float, b: float, step: float) -> None:
    """A step of 1e-7 in the pitches moves Nu by at most 1e-5, from triangle to triangle and over the hull."""
    bank = {"arrangement": 1.0, "rows": 10.0, "prandtl": 0.7, "reynolds": 1e4}
    here = float(GRIMISON.function(**bank, transverse_pitch_ratio=a, longitudinal_pitch_ratio=b))
    beside = float(
        GRIMISON.function(**bank, transverse_pitch_ratio=a + step, longitudinal_pitch_ratio=b - step)
    )
    assert beside == pytest.approx(here, rel=1e-5)


@pytest.mark.parametrize(
    ("composite", "prandtl", "reynolds", "parent"),
    [
        (GAS, 0.7, 499.0, ESDU),
        (GAS, 0.7, 1001.0, GNIELINSKI),
        (GAS, 0.7, 9.9e4, GNIELINSKI),
        (GAS, 0.7, 4.1e5, ZUKAUSKAS),
        (LIQUID, 5.0, 499.0, ESDU),
        (LIQUID, 5.0, 2.9e4, GNIELINSKI),
        (LIQUID, 5.0, 1.01e5, ZUKAUSKAS),
        (LIQUID, 71.0, 5e3, ZUKAUSKAS),
    ],
)
def test_default_is_bit_for_bit_its_parent_away_from_the_passages(
    composite: Method, prandtl: float, reynolds: float, parent: Method
) -> None:
    """Each law stands alone in its own range, its row shares too."""
    bank = {**TRIANGLE, "rows": 6.0, "prandtl": prandtl, "reynolds": reynolds}
    if composite is GAS:
        walls = {"prandtl_wall": 0.69, "temperature_ratio": 0.9}
        own: Quantities = {**walls, "gas": 1.0}
    else:
        walls = {"prandtl_wall": 4.0}
        own = {**walls, "gas": 0.0}
    value = float(composite.function(**bank, **walls))
    assert value == float(parent.function(**asked(parent, {**bank, **own})))
    assert composite.row_share is not None
    assert parent.row_share is not None
    rows = np.arange(1.0, 7.0)
    expected = parent.row_share(row=rows, **bank)
    assert composite.row_share(row=rows, **bank) == pytest.approx(expected, rel=1e-14)


def test_default_goes_by_geometry_and_phase_alone() -> None:
    """In-line banks with a/b below 0.7 take the one law that answers with a warning; others go by phase."""
    assert auto_outside_heat_transfer(True, 1.5, 3.0, True) == "gnielinski-zukauskas-gas"
    assert auto_outside_heat_transfer(False, 2.0, 2.0, False) == "gnielinski-zukauskas-liquid"
    assert auto_outside_heat_transfer(False, 1.5, 3.0, True) == "gnielinski-1979"
    within, notes = in_range(
        GNIELINSKI,
        {
            **SQUARE,
            "transverse_pitch_ratio": 1.5,
            "longitudinal_pitch_ratio": 3.0,
            "prandtl": 0.7,
            "reynolds": 1e4,
        },
    )
    assert not within
    assert "0.5 is below 0.7" in (notes[0] or "")


def test_banks_lie_above_the_single_cylinder_at_moderate_reynolds_numbers() -> None:
    """A bank of usual pitches transfers better than a lone cylinder in the same duct, common practice."""
    cylinder = method(ROLE, "churchill-bernstein-1977")
    for bank in (SQUARE, TRIANGLE):
        quantities = {**bank, "prandtl": 0.7, "reynolds": np.geomspace(1e3, 1e5, 9)}
        lone = cylinder.function(**asked(cylinder, quantities))
        assert (GAS.function(**asked(GAS, quantities)) > lone).all()
