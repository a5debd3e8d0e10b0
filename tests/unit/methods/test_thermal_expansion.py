"""Held tubes: balance of forces, limits of stiffness, buckling, remedies, sag."""

import numpy as np
import pytest

from crossbank_service.methods import thermal_expansion
from crossbank_service.methods.criterion import BEYOND, NEAR, WITHIN

MODULUS, AREA, ALPHA = 198e9, 1.5e-4, 12.2e-6


def test_tubes_and_frame_pull_each_other_with_equal_force() -> None:
    """The forces of all tubes and of the frame add up to nothing, in every case."""
    rise = np.array([[150.0, 120.0, 90.0, 60.0], [20.0, 60.0, 100.0, 140.0]])
    count = np.array([20.0, 19.0, 20.0, 19.0])
    found = thermal_expansion.framed_forces(
        count,
        MODULUS,
        AREA,
        ALPHA,
        rise,
        frame_stiffness_n=np.array([[1.2e9], [0.0]]),
        frame_expansion_per_k=12e-6,
        frame_rise_k=40.0,
    )
    total = (count * found.tube_force_n).sum(axis=-1, keepdims=True) + found.frame_force_n
    np.testing.assert_allclose(total, 0.0, atol=1e-6 * MODULUS * AREA * ALPHA * 100.0)


def test_the_hottest_row_is_in_compression_and_the_coldest_in_tension() -> None:
    """Without a frame each row works against the mean of the bank: half the difference of two equal rows."""
    found = thermal_expansion.framed_forces(10.0, MODULUS, AREA, ALPHA, np.array([[100.0, 40.0]]))
    expected = MODULUS * AREA * ALPHA * 30.0
    np.testing.assert_allclose(found.tube_force_n, [[-expected, expected]], rtol=1e-12)


def test_an_endless_frame_is_the_rigid_one_and_an_equal_one_halves_the_force() -> None:
    """The rigid force is the limit; equal stiffness of bank and frame gives half of it."""
    rigid = thermal_expansion.held_rigid_force_n(MODULUS, AREA, ALPHA, 100.0)
    stiffness = 40.0 * MODULUS * AREA
    forces = [
        thermal_expansion.framed_forces(40.0, MODULUS, AREA, ALPHA, 100.0, frame_stiffness_n=k).tube_force_n[
            0
        ]
        for k in (1e12 * stiffness, stiffness, 0.0)
    ]
    np.testing.assert_allclose(forces, [float(rigid), 0.5 * float(rigid), 0.0], rtol=1e-11, atol=1e-9)


def test_a_case_alone_equals_the_case_beside_others() -> None:
    """Bit for bit, also when rows are laid out differently in memory."""
    rise = np.random.default_rng(5).uniform(20.0, 200.0, (7, 23))
    together = thermal_expansion.framed_forces(
        3.0, MODULUS, AREA, ALPHA, np.asfortranarray(rise)
    ).tube_force_n
    alone = thermal_expansion.framed_forces(3.0, MODULUS, AREA, ALPHA, rise[4:5]).tube_force_n
    assert np.array_equal(together[4:5], alone)


def test_johnson_and_euler_meet_at_half_the_yield_stress() -> None:
    """At the limiting slenderness both give sy/2."""
    limit = np.sqrt(2.0 * np.pi**2 * 200e9 / 240e6)
    found = thermal_expansion.buckling_stress_pa(
        limit * np.array([1e-9, 1.0 - 1e-9, 1.0 + 1e-9]), 200e9, 240e6
    )
    np.testing.assert_allclose(found, [240e6, 120e6, 120e6], rtol=1e-8)


def test_tension_neither_buckles_nor_slows_the_tube() -> None:
    """Compression at half the Euler load takes 29 % off the frequency; tension has ratio 0."""
    load = 10e3
    force = np.array([5e3, -5e3, -12e3])
    assert thermal_expansion.compression_ratio(force, load).tolist() == [0.0, 0.5, 1.2]
    np.testing.assert_allclose(
        thermal_expansion.frequency_factor(force, load), [np.sqrt(1.5), np.sqrt(0.5), 0.0], rtol=1e-12
    )
    grades = thermal_expansion.BUCKLING.grade(thermal_expansion.compression_ratio(force, load))
    assert grades.tolist() == [WITHIN, WITHIN, BEYOND]
    assert thermal_expansion.BUCKLING.grade(0.7) == NEAR


def test_a_warmer_tie_in_brings_the_force_to_the_wanted_one() -> None:
    """Tied in at the temperature found, the rigid force is the wanted one."""
    force = thermal_expansion.held_rigid_force_n(MODULUS, AREA, ALPHA, 430.0 - 293.0)
    tie_in = thermal_expansion.tie_in_temperature_k(force, -10e3, 293.0, MODULUS, AREA, ALPHA)
    again = thermal_expansion.held_rigid_force_n(MODULUS, AREA, ALPHA, 430.0 - tie_in)
    assert again == pytest.approx(-10e3, rel=1e-10)


def test_the_longest_span_has_the_wanted_share_of_the_euler_load() -> None:
    """Put back, the force is half the load; a tube in tension may have any span."""
    span = thermal_expansion.longest_span_m(np.array([-20e3, 5e3]), 2090.0, 0.7)
    assert thermal_expansion.compression_ratio(
        -20e3, thermal_expansion.euler_load_n(2090.0, span[0], 0.7)
    ) == pytest.approx(0.5, rel=1e-12)
    assert span[1] == 100.0


def test_sag_and_its_slope_follow_from_the_same_beam() -> None:
    """Deflection lines of a uniformly loaded span, differentiated on a fine grid."""
    w, span, ei = 15.0, 1.2, 2090.0
    x = np.linspace(0.0, span, 200_001)
    pinned = w * x * (span**3 - 2.0 * span * x**2 + x**3) / (24.0 * ei)
    built_in = w * x**2 * (span - x) ** 2 / (24.0 * ei)
    for line, held in ((pinned, False), (built_in, True)):
        sag = thermal_expansion.sag_m(w, span, ei, built_in=held)
        slope = thermal_expansion.sag_slope(w, span, ei, built_in=held)
        assert sag == pytest.approx(line.max(), rel=1e-9)
        assert slope == pytest.approx(np.abs(np.diff(line) / np.diff(x)).max(), rel=1e-4)


def test_pressure_and_free_growth_by_hand() -> None:
    """pi/4 x 0.02^2 x 1 MPa = 314.16 N; 3 m x 12e-6 x 100 K = 3.6 mm."""
    assert thermal_expansion.pressure_end_force_n(1e6, 0.02) == pytest.approx(314.159, abs=5e-4)
    assert thermal_expansion.free_expansion_m(3.0, 12e-6, 100.0) == pytest.approx(3.6e-3)
