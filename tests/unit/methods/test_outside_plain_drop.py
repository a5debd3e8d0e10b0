"""Outside pressure drop of plain banks: behaviour over the whole range."""

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st
from tests.unit.methods.outside_plain_banks import DROP, Quantities, any_bank, asked, usual_bank

from crossbank_service.methods import Method, auto_outside_pressure_drop, method
from crossbank_service.methods import outside_plain_euler as euler

ROLE = "outside_pressure_drop"
DEFAULT = method(ROLE, "gaddis-zukauskas-blend")
GADDIS = method(ROLE, "gaddis-gnielinski-1985")
ULINSKAS = method(ROLE, "zukauskas-ulinskas-1988")
SHAW = method(ROLE, "gunter-shaw-1945")
SWEEP = np.exp(np.linspace(np.log(1e-3), np.log(1e7), 3000))


def _slug(record: Method) -> str:
    return record.slug


def _bank(a: float, b: float, staggered: bool, rows: float = 10.0) -> Quantities:
    return {
        "transverse_pitch_ratio": a,
        "longitudinal_pitch_ratio": b,
        "arrangement": float(staggered),
        "rows": rows,
    }


def _count(record: Method, bank: Quantities) -> float:
    return bank["rows"] if record.resistances is None else float(record.resistances(**bank))


@pytest.mark.parametrize("record", DROP, ids=_slug)
@given(bank=any_bank())
def test_loss_coefficient_is_finite_and_positive_for_whatever_is_asked(
    record: Method, bank: Quantities
) -> None:
    """From standing fluid to Re 1e7, pitches that no tubes can have included, without a numpy warning."""
    value = float(record.function(**asked(record, bank)))
    assert np.isfinite(value)
    assert value > 0.0


@pytest.mark.parametrize("record", DROP, ids=_slug)
@given(bank=usual_bank(), ratio=st.floats(0.3, 3.0))
def test_loss_coefficient_has_no_jump_over_the_reynolds_number(
    record: Method, bank: Quantities, ratio: float
) -> None:
    """A step of 1e-4 in Re never moves xi by more than ten times that, joins and stand-ins included."""
    quantities = {**bank, "viscosity_ratio": ratio}
    here = record.function(**asked(record, {**quantities, "reynolds": SWEEP}))
    beside = record.function(**asked(record, {**quantities, "reynolds": SWEEP * 1.0001}))
    assert np.abs(beside / here - 1.0).max() < 1e-3


@pytest.mark.parametrize("record", [DEFAULT, GADDIS], ids=_slug)
@given(bank=usual_bank())
def test_drop_rises_with_the_flow(record: Method, bank: Quantities) -> None:
    """The drop of one fluid in one bank, as xi Re^2, rises throughout: a flow is found for any drop."""
    value = record.function(**asked(record, {**bank, "reynolds": SWEEP})) * SWEEP**2
    assert (np.diff(value) > 0.0).all()


@pytest.mark.parametrize("record", DROP, ids=_slug)
def test_a_case_gives_the_same_bits_alone_and_among_others(record: Method) -> None:
    """Seven hundred mixed cases at once against each one alone, arrays and plain numbers."""
    rng = np.random.default_rng(6)
    n = 700
    quantities = {
        "reynolds": np.exp(rng.uniform(0.0, 15.0, n)),
        "transverse_pitch_ratio": rng.uniform(1.2, 3.5, n),
        "longitudinal_pitch_ratio": rng.uniform(0.8, 3.5, n),
        "arrangement": rng.integers(0, 2, n).astype(float),
        "rows": rng.integers(1, 25, n).astype(float),
        "viscosity_ratio": rng.uniform(0.3, 3.0, n),
    }
    inputs = asked(record, quantities)
    together = record.function(**inputs)
    alone = [float(record.function(**{k: float(v[i]) for k, v in inputs.items()})) for i in range(n)]
    assert together.tolist() == alone


@pytest.mark.parametrize(
    ("fits", "reynolds", "printed"),
    [
        (euler._INLINE, 1e4, (0.4333, 0.3365, 0.2412, 0.1740)),
        (euler._INLINE, 1e5, (0.2910, 0.2535, 0.2012, 0.1576)),
        (euler._INLINE[:3], 300.0, (0.9631, 0.5520, 0.3697)),
        (euler._STAGGERED, 9999.999, (0.4982, 0.3851, 0.3726, 0.3147)),
        (euler._STAGGERED, 1e5, (0.2779, 0.2271, 0.1865, 0.1640)),
        (euler._STAGGERED, 300.0, (1.6220, 1.0519, 0.8353, 0.5557)),
    ],
)
def test_euler_fits_meet_values_worked_by_hand(
    fits: tuple[tuple[euler._Fit, ...], ...], reynolds: float, printed: tuple[float, ...]
) -> None:
    """Eu/k of the tabulated pitches, worked by hand from the fits of HEDH 2.2.4."""
    for pieces, expected in zip(fits, printed, strict=True):
        piece = next(piece for piece in pieces if piece.low <= reynolds <= piece.high)
        value = float(np.exp(piece.logarithm(np.array([reynolds])))[0])
        assert value == pytest.approx(expected, abs=5.1e-5)


def test_slow_inline_bank_of_wide_rows_takes_the_law_that_has_a_viscous_range() -> None:
    """Below Re 600 the b = 2.5 fit does not reach: the whole drop is that of Gaddis & Gnielinski."""
    bank = _bank(2.0, 2.5, staggered=False)
    assert float(ULINSKAS.function(**bank, reynolds=200.0)) == pytest.approx(
        float(GADDIS.function(**bank, reynolds=200.0)), rel=1e-12
    )


def test_three_laws_agree_on_the_viscous_loss_of_close_square_banks() -> None:
    """Published laws without common data, Re 10: 20.5, 20.9, 21.7 at 1.25 and 9.2, 8.5, 8.9 at 1.5."""
    for pitch, expected in ((1.25, (20.5, 20.9, 21.7)), (1.5, (9.2, 8.5, 8.9))):
        bank = {**_bank(pitch, pitch, staggered=False), "reynolds": 10.0}
        layout = (
            1.009  # the fit's own layout factor at equal pitches, of which the printed 21.7 and 8.9 are free
        )
        values = (
            float(GADDIS.function(**bank)),
            float(SHAW.function(**asked(SHAW, bank))),
            float(ULINSKAS.function(**bank)) / layout,
        )
        assert values == pytest.approx(expected, abs=0.055)


def test_diagonal_banks_count_one_resistance_less() -> None:
    """By the VDI rule: n - 1 with the diagonal gap governing, n otherwise, one row alone one."""
    assert _count(GADDIS, _bank(3.0, 1.0, staggered=True, rows=8.0)) == 7.0
    assert _count(GADDIS, _bank(3.0, 1.0, staggered=True, rows=1.0)) == 1.0
    assert _count(GADDIS, _bank(3.0, 1.5, staggered=True, rows=8.0)) == 8.0
    assert _count(GADDIS, _bank(3.0, 1.0, staggered=False, rows=8.0)) == 8.0
    assert _count(DEFAULT, _bank(3.0, 1.0, staggered=True, rows=8.0)) == 7.0


@given(bank=usual_bank(), reynolds=st.floats(1500.0, 2e5), ratio=st.floats(0.3, 3.0))
def test_default_is_bit_for_bit_gaddis_in_the_middle_range(
    bank: Quantities, reynolds: float, ratio: float
) -> None:
    """From Re 1500 to 2e5 the default is Gaddis & Gnielinski 1985 and nothing else."""
    quantities = {**bank, "reynolds": reynolds, "viscosity_ratio": ratio}
    assert float(DEFAULT.function(**quantities)) == float(GADDIS.function(**quantities))


@pytest.mark.parametrize(
    "bank", [_bank(2.5, 0.9, staggered=True, rows=11.0), _bank(2.0, 1.5, staggered=True)]
)
def test_default_of_wide_staggered_banks_is_the_geometric_mean_of_the_whole_drops(bank: Quantities) -> None:
    """Re 300, a of 2 and more: sqrt of the product, whatever each law counts as resistances."""
    quantities = {**bank, "reynolds": 300.0}
    drops = [float(m.function(**quantities)) * _count(m, bank) for m in (DEFAULT, GADDIS, ULINSKAS)]
    assert drops[0] == pytest.approx(np.sqrt(drops[1] * drops[2]), rel=1e-12)


def test_default_of_wide_staggered_banks_lies_near_the_drag_of_a_lone_cylinder() -> None:
    """Drag over pitch, Cd/a, of the standard drag curve of cylinders (from memory, read to 5 %): to 30 %."""
    value = DEFAULT.function(
        **_bank(2.0, 1.732, staggered=True), reynolds=np.array([100.0, 300.0, 600.0, 799.0])
    )
    assert np.abs(np.log(value / np.array([0.69, 0.62, 0.54, 0.51]))).max() < 0.3


def test_default_is_the_euler_fits_at_high_reynolds_numbers() -> None:
    """Above Re 4e5 the whole drop is that of Zukauskas & Ulinskas 1988."""
    bank = _bank(2.5, 0.9, staggered=True, rows=12.0)
    drops = [float(m.function(**bank, reynolds=5e5)) * _count(m, bank) for m in (DEFAULT, ULINSKAS)]
    assert drops[0] == pytest.approx(drops[1], rel=1e-13)


def test_default_of_short_banks_keeps_the_end_losses_at_high_reynolds_numbers() -> None:
    """By hand: five rows in line at 2 x 2 carry f_n = (1/5 - 1/10)/4 in each row on top of the Euler fits."""
    bank = _bank(2.0, 2.0, staggered=False, rows=5.0)
    value = float(DEFAULT.function(**bank, reynolds=5e5))
    assert value == pytest.approx(float(ULINSKAS.function(**bank, reynolds=5e5)) + 0.025, rel=1e-12)


def test_default_of_close_slow_banks_is_gaddis() -> None:
    """In-line banks and staggered ones with a up to 1.5 have one law below Re 2e5."""
    for bank in (_bank(2.0, 2.0, staggered=False), _bank(1.5, 1.3, staggered=True)):
        quantities = {**bank, "reynolds": SWEEP[SWEEP < 2e5]}
        assert (DEFAULT.function(**quantities) == GADDIS.function(**quantities)).all()


def test_one_default_serves_every_bank() -> None:
    """The pressure drop's default does not depend on geometry or phase."""
    assert auto_outside_pressure_drop() == DEFAULT.slug
