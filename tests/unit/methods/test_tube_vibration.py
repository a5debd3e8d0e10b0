"""Vortex shedding and turbulence buffeting."""

import numpy as np
import pytest

from crossbank_service.methods import beam_frequency as bf
from crossbank_service.methods import tube_vibration as tv
from crossbank_service.methods.criterion import BEYOND, NEAR, WITHIN

ROOT2, ROOT3 = np.sqrt(2.0), np.sqrt(3.0)


def _layout(a: float, b: float, staggered: float) -> dict[str, np.ndarray]:
    return {
        "transverse_pitch_ratio": np.array([a]),
        "longitudinal_pitch_ratio": np.array([b]),
        "arrangement": np.array([staggered]),
    }


def _pinned(length: float) -> dict[str, np.ndarray]:
    """Closed-form integrals of the first mode of one pinned span, spread over eight cells."""
    x = np.linspace(0.0, np.pi, 9)
    squared = 0.5 * (np.diff(x) - 0.5 * np.diff(np.sin(2.0 * x))) * length / np.pi
    absolute = -np.diff(np.cos(x)) * length / np.pi
    return {
        "squared_m": squared[None, None, None, :],
        "absolute_m": absolute[None, None, None, :],
        "modal_mass_m": np.array([[0.5 * length]]),
    }


def test_pitch_and_gap_velocities_agree_for_the_triangle_and_the_square() -> None:
    """U_p equals U_gap at 30 and 90 degrees and exceeds it at 45 and 60."""
    p = 1.5
    for a, b, s, equal in (
        (p, p * ROOT3 / 2.0, 1.0, True),
        (p, p, 0.0, True),
        (p * ROOT2, p / ROOT2, 1.0, False),
        (p * ROOT3, p / 2.0, 1.0, False),
    ):
        pitch, gap = (f(**_layout(a, b, s))[0] for f in (tv.pitch_velocity_ratio, tv.gap_velocity_ratio))
        assert pitch == pytest.approx(3.0, rel=1e-12)
        assert bool(np.isclose(gap, pitch, rtol=1e-12)) is equal


def test_wide_banks_shed_like_single_cylinders() -> None:
    """At P/D 6 the Strouhal number between the tubes is 0.2 for every layout."""
    p = 6.0
    for a, b, s, pattern in (
        (p, p * ROOT3 / 2.0, 1.0, 30),
        (p * ROOT2, p / ROOT2, 1.0, 45),
        (p * ROOT3, p / 2.0, 1.0, 60),
        (p, p, 0.0, 90),
    ):
        strouhal = tv.shedding_strouhal(pattern=np.array([pattern]), **_layout(a, b, s))[0]
        assert strouhal / tv.pitch_velocity_ratio(**_layout(a, b, s))[0] == pytest.approx(0.2, rel=1e-12)


def test_unequal_inline_pitches_use_the_longitudinal_one() -> None:
    """By f = U_gap/(2 SL) tubes of 1.75 x 1.5 give S 0.333 on the gap velocity."""
    layout = _layout(1.75, 1.5, 0.0)
    strouhal = tv.shedding_strouhal(pattern=np.array([90]), **layout)[0]
    assert strouhal / tv.gap_velocity_ratio(**layout)[0] == pytest.approx(1.0 / 3.0, rel=1e-12)


def test_band_offers_the_ratio_nearest_to_resonance() -> None:
    """A band that covers the mode gives 1, one that misses it gives its nearer end."""
    ratio = tv.nearest_frequency_ratio(
        shedding_hz=np.array([90.0, 40.0, 200.0]), band=0.25, frequency_hz=np.array([100.0, 100.0, 100.0])
    )
    np.testing.assert_allclose(ratio, [1.0, 0.5, 1.5], rtol=1e-14)


def test_lock_in_band_has_its_ends_outside() -> None:
    """0.7 and 1.3 are no coincidence, what lies between is."""
    assert tv.locks_in(np.array([0.7, 0.71, 1.0, 1.29, 1.3])).tolist() == [False, True, True, True, False]


def test_shedding_grade_needs_both_coincidence_and_amplitude() -> None:
    """Outside the band within; inside it harmless by damping or amplitude near; else beyond."""
    grade = tv.shedding_grade(
        frequency_ratio=np.array([1.5, 1.0, 1.0, 1.0]),
        reduced_damping=np.array([1.0, 64.0, 5.0, 5.0]),
        amplitude_share=np.array([0.5, 0.5, 0.02, 0.021]),
    )
    assert grade.tolist() == [WITHIN, NEAR, NEAR, BEYOND]


def test_resonant_amplitude_on_a_pinned_span() -> None:
    """CL U^2 rho D/(4 pi^3 f^2 m zeta) in water is 0.4542 mm (hand calculation)."""
    y = tv.lock_in_amplitude(
        lift_coefficient=np.array([0.075]),
        velocity_m_s=np.array([[0.8]]),
        density_kg_m3=np.array([998.0]),
        diameter_m=np.array([0.0254]),
        frequency_hz=np.array([[30.0]]),
        mass_kg_m=np.array([2.0]),
        damping_ratio=np.array([[0.012]]),
        absolute_m=_pinned(1.0)["absolute_m"],
        modal_mass_m=_pinned(1.0)["modal_mass_m"],
    )
    assert y[0, 0] == pytest.approx(4.542e-4, abs=0.5e-7)


def test_lift_coefficient_rises_to_that_of_the_lone_tube() -> None:
    """0.075 in dense banks, 0.5 from P/D 3."""
    np.testing.assert_allclose(
        tv.lift_coefficient(np.array([1.3, 1.6, 2.3, 3.0, 9.0])), [0.075, 0.075, 0.2875, 0.5, 0.5]
    )


def _buffet(
    density: float, velocity: float, frequency: float, zeta: float, length: float, *, upstream: bool
) -> float:
    shape = _pinned(length)
    y = tv.taylor_pettigrew_2000(
        velocity_m_s=np.array([[velocity]]),
        density_kg_m3=np.array([density]),
        diameter_m=np.array([0.0254]),
        frequency_hz=np.array([[frequency]]),
        mass_kg_m=np.array([2.0]),
        damping_ratio=np.array([[zeta]]),
        squared_m=shape["squared_m"],
        modal_mass_m=shape["modal_mass_m"],
        upstream=np.array([upstream]),
    )
    return float(y[0, 0])


def test_buffeting_amplitudes_on_a_pinned_span() -> None:
    """sqrt(S_F/(4 pi^5 f^3 m^2 zeta)) in air and water (hand calculations)."""
    assert _buffet(1.1, 12.0, 22.0, 0.004, 1.2, upstream=False) == pytest.approx(8.977e-6, abs=0.5e-9)
    assert _buffet(998.0, 1.0, 35.0, 0.015, 1.0, upstream=True) == pytest.approx(5.572e-5, abs=0.5e-8)
    assert _buffet(998.0, 1.0, 35.0, 0.015, 1.0, upstream=False) == pytest.approx(1.1145e-5, abs=0.5e-9)


def test_still_fluid_excites_nothing() -> None:
    """At rest the amplitude is 0, not a number that is none."""
    assert _buffet(998.0, 0.0, 35.0, 0.015, 1.0, upstream=True) == 0.0


def test_buffeting_falls_as_spans_share_a_mode() -> None:
    """Without long correlation two spans double the mean square force and the mass: y falls by sqrt 2."""
    one, two = (
        bf.tube_modes(
            spans_m=np.array([spans]),
            stiffness_n_m2=np.array([2000.0]),
            mass_kg_m=np.array([2.0]),
            ends=np.array([bf.PINNED]),
            axial_force_n=np.zeros(1),
            modes=1,
        )
        for spans in ([1.0], [1.0, 1.0])
    )
    amplitude = [
        tv.taylor_pettigrew_2000(
            velocity_m_s=np.full((1, m.shape.shape[2]), 10.0),
            density_kg_m3=np.array([1.2]),
            diameter_m=np.array([0.0254]),
            frequency_hz=m.frequency_hz,
            mass_kg_m=np.array([2.0]),
            damping_ratio=np.array([[0.004]]),
            squared_m=m.squared_m,
            modal_mass_m=m.modal_mass_m,
            upstream=np.array([False]),
        )[0, 0]
        for m in (one, two)
    ]
    assert amplitude[0] / amplitude[1] == pytest.approx(np.sqrt(2.0), rel=2e-3)


def test_older_reading_is_harsher_upstream() -> None:
    """Pettigrew and Gorman on a pinned span: C_R rho U^2 D/2 correlated over it (hand calculation)."""
    shape = _pinned(1.0)
    y = tv.pettigrew_gorman_1978(
        velocity_m_s=np.array([[1.0]]),
        density_kg_m3=np.array([998.0]),
        diameter_m=np.array([0.0254]),
        frequency_hz=np.array([[35.0]]),
        mass_kg_m=np.array([2.0]),
        damping_ratio=np.array([[0.015]]),
        absolute_m=shape["absolute_m"],
        modal_mass_m=shape["modal_mass_m"],
        upstream=np.array([True]),
    )[0, 0]
    # 0.025 x 12.6746 N/m over sqrt(4 pi^5 35^3 x 4 x 0.015)
    assert y == pytest.approx(1.7858e-4, rel=2e-4)
    assert y > _buffet(998.0, 1.0, 35.0, 0.015, 1.0, upstream=True)


def test_random_force_coefficient_joins_at_40_hz() -> None:
    """The falling branch starts where the level one ends."""
    c = tv.random_force_coefficient(frequency_hz=np.array([40.0, 40.0001]), upstream=np.array([True, True]))
    assert c[1] == pytest.approx(c[0], rel=2e-3)


def test_turbulence_spectrum_joins_and_upstream_is_25_times_interior() -> None:
    """Both branches meet at 0.5, and below the data the value is held."""
    x = np.array([0.5, 0.5 + 1e-9, 0.01, 1e-6])
    interior = tv.turbulence_spectrum(reduced_frequency=x, upstream=np.zeros(4, dtype=bool))
    assert interior[1] == pytest.approx(interior[0], rel=1e-3)
    assert interior[2] == interior[3]
    upstream = tv.turbulence_spectrum(reduced_frequency=x, upstream=np.ones(4, dtype=bool))
    np.testing.assert_allclose(upstream, 25.0 * interior, rtol=1e-14)


def test_work_rate_on_a_pinned_span() -> None:
    """8 pi^3 f^3 m L y^2 zeta for the upstream amplitude in water is 0.9907 mW (hand calculation)."""
    w = tv.work_rate(
        frequency_hz=np.array([[35.0]]),
        mass_kg_m=np.array([2.0]),
        modal_mass_m=np.array([[0.5]]),
        amplitude_m=np.array([[5.572e-5]]),
        damping_ratio=np.array([[0.015]]),
    )
    assert w[0, 0] == pytest.approx(9.907e-4, rel=2e-4)


def test_effective_velocity_of_two_equal_spans_is_the_mean_square() -> None:
    """10 and 4 m/s on halves of the mode make 7.6158 m/s; on 1.0/1.8/1.3 m with 4/10/6 m/s it is 9.811."""
    two, three = (
        bf.tube_modes(
            spans_m=np.array([spans]),
            stiffness_n_m2=np.array([2000.0]),
            mass_kg_m=np.array([2.0]),
            ends=np.array([ends]),
            axial_force_n=np.zeros(1),
        )
        for spans, ends in (([1.2, 1.2], bf.PINNED), ([1.0, 1.8, 1.3], bf.FIXED))
    )
    for modes, velocity, printed, digits in (
        (two, [[10.0, 4.0]], 7.6158, 1e-4),
        (three, [[4.0, 10.0, 6.0]], 9.811, 5e-4),
    ):
        v = tv.effective_velocity(
            velocity_m_s=np.array(velocity), squared_m=modes.squared_m, modal_mass_m=modes.modal_mass_m
        )
        assert v[0, 0] == pytest.approx(printed, abs=digits)


def test_uniform_stream_is_its_own_effective_velocity() -> None:
    """Whatever the mode; a span out of the stream or a heavier tube lowers it."""
    modes = bf.tube_modes(
        spans_m=np.array([[0.8, 1.2]]),
        stiffness_n_m2=np.ones(1),
        mass_kg_m=np.ones(1),
        ends=np.array([bf.FIXED]),
        axial_force_n=np.zeros(1),
    )
    shape = {"squared_m": modes.squared_m, "modal_mass_m": modes.modal_mass_m}
    even = tv.effective_velocity(velocity_m_s=np.full((1, 2), 7.0), **shape)
    np.testing.assert_allclose(even, 7.0, rtol=1e-12)
    assert np.all(tv.effective_velocity(velocity_m_s=np.array([[0.0, 7.0]]), **shape) < even)


def test_stream_profile_keeps_the_integral_of_the_squared_velocity() -> None:
    """A stream from 0.35 to 1.9 m over spans of 1.0 and 1.5 m carries U^2 times 1.55 m."""
    spans = np.array([[1.0, 1.5, 0.0]])
    profile = tv.stream_profile(
        spans_m=spans, start_m=np.array([0.35]), end_m=np.array([1.9]), velocity_m_s=np.array([6.0])
    )
    assert profile.shape == (1, 3, 8)
    assert np.sum(profile**2 * spans[..., None] / 8.0) == pytest.approx(36.0 * 1.55, rel=1e-12)
    assert profile[0, 0, 0] == 0.0
    assert profile[0, 1, 0] == pytest.approx(6.0, rel=1e-14)
    assert np.all(profile[0, 2] == 0.0)


def test_accepted_amplitude_is_the_smaller_of_two() -> None:
    """0.25 mm for wide tubes, a hundredth of the diameter for narrow ones."""
    np.testing.assert_allclose(tv.buffeting_limit(np.array([0.0508, 0.01])), [0.25e-3, 0.1e-3], rtol=1e-14)


def test_every_law_and_criterion_states_its_source() -> None:
    """Slugs are unique and nothing is without source and trust."""
    slugs = [law.slug for law in tv.LAWS]
    assert len(set(slugs)) == len(slugs)
    assert all(law.source and law.attribution for law in tv.LAWS)
    assert all(c.attribution and c.caution for c in tv.CRITERIA)


def test_excitation_of_a_tube_does_not_depend_on_the_others() -> None:
    """Neighbours and the columns they need change no bit of a tube's velocities and amplitudes."""
    rng = np.random.default_rng(11)
    n, most = 12, 10
    spans, velocity = rng.uniform(0.4, 1.6, (n, most)), rng.uniform(0.0, 20.0, (n, most))
    for i in range(n):
        spans[i, 1 + i % most :] = velocity[i, 1 + i % most :] = 0.0
    d, m, rho = rng.uniform(0.01, 0.05, n), rng.uniform(0.5, 6.0, n), rng.uniform(0.5, 1000.0, n)
    zeta = rng.uniform(0.002, 0.02, (n, 6))
    upstream = rng.uniform(size=n) > 0.5

    def evaluate(at: slice, columns: int) -> list[np.ndarray]:
        size = len(d[at])
        modes = bf.tube_modes(
            spans_m=spans[at, :columns],
            stiffness_n_m2=np.full(size, 3000.0),
            mass_kg_m=m[at],
            ends=np.full(size, bf.FIXED),
            axial_force_n=np.zeros(size),
            modes=6,
        )
        v, f = velocity[at, :columns], modes.frequency_hz
        mass = modes.modal_mass_m
        lock_in = tv.lock_in_amplitude(
            lift_coefficient=np.full(size, 0.075),
            velocity_m_s=v,
            density_kg_m3=rho[at],
            diameter_m=d[at],
            frequency_hz=f,
            mass_kg_m=m[at],
            damping_ratio=zeta[at],
            absolute_m=modes.absolute_m,
            modal_mass_m=mass,
        )
        buffeting = tv.taylor_pettigrew_2000(
            velocity_m_s=v,
            density_kg_m3=rho[at],
            diameter_m=d[at],
            frequency_hz=f,
            mass_kg_m=m[at],
            damping_ratio=zeta[at],
            squared_m=modes.squared_m,
            modal_mass_m=mass,
            upstream=upstream[at],
        )
        effective = tv.effective_velocity(velocity_m_s=v, squared_m=modes.squared_m, modal_mass_m=mass)
        return [lock_in, buffeting, effective]

    together = evaluate(slice(0, n), most)
    assert all(np.isfinite(values).all() for values in together)
    for i in range(n):
        for alone, beside in zip(evaluate(slice(i, i + 1), 1 + i % most), together, strict=True):
            assert np.array_equal(alone[0], beside[i])
