"""Fluidelastic instability: curves, their joins, the verdict and what would help."""

import numpy as np
import pytest

from crossbank_service.methods import beam_frequency as bf
from crossbank_service.methods import tube_instability as ti
from crossbank_service.methods.criterion import BEYOND, NEAR, WITHIN

PATTERNS = np.array([30, 45, 60, 90])


def _reduced(law: str, x: float, pitch_ratio: float = 1.5) -> np.ndarray:
    """V_c/(f D) of the four layouts."""
    record = next(r for r in ti.LAWS if r.slug == law)
    return record.function(
        frequency_hz=np.ones(4),
        diameter_m=np.ones(4),
        mass_damping=np.full(4, x),
        pitch_ratio=np.full(4, pitch_ratio),
        pattern=PATTERNS,
    )


def test_default_constant_is_continuous_in_the_pitch() -> None:
    """The low-pitch line meets 3.0 at P/D 1.47 within its three digits."""
    below, above = ti.pettigrew_taylor_constant(np.array([1.47 - 1e-9, 1.47]))
    assert below == pytest.approx(2.997, abs=5e-4)
    assert above == 3.0


def test_weaver_fitzpatrick_branches_join_within_two_percent() -> None:
    """At X = 0.3 the level and the rising branch are the same; 60 degrees is not offered."""
    below, above = _reduced("weaver-fitzpatrick-1988", 0.3 - 1e-9), _reduced("weaver-fitzpatrick-1988", 0.3)
    offered = PATTERNS != 60
    assert np.all(np.abs(above[offered] / below[offered] - 1.0) < 0.025)
    assert np.all(np.isinf(above[~offered]))


def test_chen_jumps_only_where_the_original_does() -> None:
    """30 degrees jumps at X = 2, the in-line and 60 degree lines join within 6 %."""
    join = {30: 2.0, 60: 1.0, 90: 0.7}
    for i, pattern in enumerate(PATTERNS.tolist()):
        if pattern in join:
            x = join[pattern]
            ratio = _reduced("chen-1984", x)[i] / _reduced("chen-1984", x * (1.0 - 1e-12))[i]
            assert (ratio > 2.0) if pattern == 30 else (abs(ratio - 1.0) < 0.06)


def test_curves_part_in_gas_as_stated() -> None:
    """At X = 70 30 degrees falls to 0.70 of the default, in-line to 0.77; 0.75 is crossed at X = 34."""
    default, weaver = _reduced("pettigrew-taylor-2003", 70.0), _reduced("weaver-fitzpatrick-1988", 70.0)
    ratio = weaver / default
    assert ratio[0] == pytest.approx(0.70, abs=0.005)
    assert ratio[3] == pytest.approx(0.77, abs=0.005)
    crossing = _reduced("weaver-fitzpatrick-1988", 34.0)[0] / _reduced("pettigrew-taylor-2003", 34.0)[0]
    assert crossing == pytest.approx(0.75, abs=0.003)


def _judge(velocity: float, pattern: int = 30) -> ti.Instability:
    one = np.ones(1)
    return ti.instability(
        approach_velocity_m_s=velocity * one,
        pitch_velocity_ratio=3.0 * one,
        gap_velocity_ratio=3.0 * one,
        frequency_hz=22.0 * one,
        diameter_m=0.0254 * one,
        mass_damping=70.829 * one,
        pitch_ratio=1.5 * one,
        pattern=np.array([pattern]),
    )


def test_ratios_use_the_velocity_of_each_criterion() -> None:
    """V_c 14.109 and 9.829 m/s against 9 m/s between the tubes."""
    answer = _judge(3.0)
    assert answer.ratio[0] == pytest.approx(9.0 / 14.109, rel=1e-4)
    assert answer.by_method["weaver-fitzpatrick-1988"][0] == pytest.approx(9.0 / 9.829, rel=1e-4)
    assert answer.highest[0] == answer.by_method["weaver-fitzpatrick-1988"][0]


@pytest.mark.parametrize(("share", "grade"), [(0.60, WITHIN), (0.72, NEAR), (0.80, NEAR), (1.01, BEYOND)])
def test_grade_is_near_once_the_lowest_curve_is_exceeded(share: float, grade: int) -> None:
    """0.72 of the default is within by itself, but above Weaver and Fitzpatrick's line for 30 degrees."""
    assert _judge(share * 14.109 / 3.0).grade.tolist() == [grade]


def test_sixty_degrees_is_judged_without_the_curve_that_is_not_offered() -> None:
    """A law not offered for the layout gives ratio 0 and never governs; every ratio is finite."""
    answer = _judge(3.0, 60)
    assert answer.by_method["weaver-fitzpatrick-1988"][0] == 0.0
    assert all(np.isfinite(v).all() for v in answer.by_method.values())
    assert answer.highest[0] == pytest.approx(9.0 / min(13.168, 0.8 * 14.109), rel=1e-4)


def test_one_row_result_of_1970_never_governs() -> None:
    """It is far above every bank's curve and only shown."""
    answer = _judge(3.0)
    assert answer.by_method["connors-1970"][0] < 0.5 * answer.ratio[0]
    assert [law.slug for law in ti.LAWS if not law.governs] == ["connors-1978", "connors-1970"]


def test_buckled_tube_is_beyond() -> None:
    """A mode without frequency gives a huge, finite ratio."""
    one = np.ones(1)
    answer = ti.instability(
        approach_velocity_m_s=one,
        pitch_velocity_ratio=3.0 * one,
        gap_velocity_ratio=3.0 * one,
        frequency_hz=0.0 * one,
        diameter_m=0.0254 * one,
        mass_damping=50.0 * one,
        pitch_ratio=1.5 * one,
        pattern=np.array([90]),
    )
    assert np.isfinite(answer.ratio).all()
    assert answer.grade.tolist() == [BEYOND]


def test_shortened_spans_meet_the_target_in_the_element_model() -> None:
    """Spans times the factor raise the frequency as much as the ratio has to fall."""
    spans = np.array([[1.0, 1.8, 1.3]])
    ratio = np.array([1.4])
    factor = ti.span_factor(ratio=ratio)
    before, after = (
        bf.tube_modes(
            spans_m=s,
            stiffness_n_m2=np.ones(1),
            mass_kg_m=np.ones(1),
            ends=np.array([bf.FIXED]),
            axial_force_n=np.zeros(1),
        ).frequency_hz[0, 0]
        for s in (spans, spans * factor)
    )
    assert 1.4 * before / after == pytest.approx(0.75, rel=1e-9)
    assert ti.required_frequency(ratio=ratio, frequency_hz=np.array([before]))[0] == pytest.approx(
        after, rel=1e-9
    )
    assert ti.span_factor(ratio=np.array([0.5]))[0] == 1.0


def test_allowable_velocity_brings_the_ratio_to_the_target() -> None:
    """All curves are linear in the velocity."""
    allowed = ti.allowable_velocity(ratio=_judge(6.0).ratio, velocity_m_s=np.array([6.0]))
    assert _judge(float(allowed[0])).ratio[0] == pytest.approx(0.75, rel=1e-12)


def test_in_flow_instability_is_flagged_for_dense_sixty_degree_banks() -> None:
    """Only there."""
    flagged = ti.in_flow_sensitive(pattern=np.array([60, 60, 30]), pitch_ratio=np.array([1.4, 1.6, 1.4]))
    assert flagged.tolist() == [True, False, False]


def test_every_law_states_source_and_velocity() -> None:
    """The default stands first, and each law names the velocity it is written in."""
    assert ti.LAWS[0].slug == "pettigrew-taylor-2003"
    assert all(law.velocity in {"pitch", "gap"} and law.attribution for law in ti.LAWS)
