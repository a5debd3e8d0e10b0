"""Standing waves in ducts with tube banks."""

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from scipy.optimize import brentq
from scipy.sparse import coo_matrix
from scipy.sparse.linalg import spsolve

from crossbank_service.methods import duct_acoustics as da
from crossbank_service.methods.tube_section import smallest_pitch_ratio

ROOT3 = np.sqrt(3.0)


def _layout(a: float, b: float, staggered: float) -> dict[str, np.ndarray]:
    return {
        "transverse_pitch_ratio": np.array([a]),
        "longitudinal_pitch_ratio": np.array([b]),
        "arrangement": np.array([staggered]),
    }


def test_square_lattice_has_the_published_conductivities() -> None:
    """Reciprocals of Perrins, McKenzie & McPhedran 1979, Table 1 (from memory), by Keller's theorem."""
    for share, conductivity in (
        (0.1, 1.222),
        (0.2, 1.500),
        (0.3, 1.860),
        (0.4, 2.351),
        (0.5, 3.080),
        (0.6, 4.342),
    ):
        pitch = np.sqrt(0.25 * np.pi / share)
        mobility = da.lattice_mobility(**_layout(pitch, pitch, 0.0))[0]
        assert 1.0 / mobility == pytest.approx(conductivity, abs=6e-4)


def test_equal_pitches_agree_with_the_closed_form() -> None:
    """Square 1.25, 1.5 and 2: the closed form is 1.4, 0.2 and 0.0 % high, as a cell problem says."""
    for p, percent in ((1.25, 1.4), (1.5, 0.2), (2.0, 0.0)):
        lattice = da.lattice_speed_ratio(**_layout(p, p, 0.0))[0]
        closed = da.parker_speed_ratio(np.array([0.25 * np.pi / p**2]))[0]
        assert 100.0 * (closed / lattice - 1.0) == pytest.approx(percent, abs=0.05)


def test_triangle_and_rotated_square_look_the_same_from_both_sides() -> None:
    """Lattices of three- and fourfold symmetry have one speed: 30 against 60 degrees, 45 against 90."""
    p = 1.3
    thirty = da.lattice_mobility(**_layout(p, p * ROOT3 / 2.0, 1.0))[0]
    sixty = da.lattice_mobility(**_layout(p * ROOT3, p / 2.0, 1.0))[0]
    square = da.lattice_mobility(**_layout(p, p, 0.0))[0]
    rotated = da.lattice_mobility(**_layout(p * np.sqrt(2.0), p / np.sqrt(2.0), 1.0))[0]
    unequal = (
        da.lattice_mobility(**_layout(2.5, 0.9, 1.0))[0],
        da.lattice_mobility(**_layout(1.8, 1.25, 1.0))[0],
    )
    assert unequal[0] != pytest.approx(unequal[1], rel=0.01)
    assert thirty == pytest.approx(sixty, rel=1e-8)
    assert square == pytest.approx(rotated, rel=1e-8)


def _finite_difference_mobility(a: float, b: float, cells: int) -> float:
    """Mobility across a staggered bank from a grid over one period a x 2b, solid cells closed to flow."""
    nx, ny = cells, round(cells * 2.0 * b / a)
    hx, hy = a / nx, 2.0 * b / ny
    x, y = (np.arange(nx) + 0.5) * hx, (np.arange(ny) + 0.5) * hy

    def gas(px: np.ndarray, py: np.ndarray) -> np.ndarray:
        clear = np.ones(np.broadcast_shapes(px.shape, py.shape), dtype=bool)
        for cx, cy in ((0.0, 0.0), (a, 0.0), (0.0, 2.0 * b), (a, 2.0 * b), (0.5 * a, b)):
            clear &= (px - cx) ** 2 + (py - cy) ** 2 > 0.25
        return clear

    # Conductance of a face: the open share of it, sampled; faces between x cells, then between y cells.
    sample = (np.arange(16) + 0.5) / 16.0 - 0.5
    right = np.mean([gas((x + 0.5 * hx)[:, None], (y + s * hy)[None, :]) for s in sample], axis=0) * hy / hx
    above = np.mean([gas((x + s * hx)[:, None], (y + 0.5 * hy)[None, :]) for s in sample], axis=0) * hx / hy
    index = np.arange(nx * ny).reshape(nx, ny)
    east, north = np.roll(index, -1, axis=0), np.roll(index, -1, axis=1)
    i = np.concatenate([index.ravel(), index.ravel()])
    j = np.concatenate([east.ravel(), north.ravel()])
    g = np.concatenate([right.ravel(), above.ravel()])
    size = nx * ny
    matrix = coo_matrix(
        (np.concatenate([g, g, -g, -g]), (np.concatenate([i, j, i, j]), np.concatenate([i, j, j, i])))
    )
    load = np.zeros(size)
    drive = right * hx
    np.add.at(load, index.ravel(), drive.ravel())
    np.add.at(load, east.ravel(), -drive.ravel())
    stiff = (matrix + coo_matrix((np.full(size, 1e-9), (np.arange(size), np.arange(size))))).tocsr()
    phi = spsolve(stiff, load).reshape(nx, ny)
    flux = right * (hx + np.roll(phi, -1, axis=0) - phi)
    # Flow through any section x = const for a unit gradient, over the section's height.
    return float(np.sum(flux) / nx / (2.0 * b))


def test_staggered_unequal_pitches_agree_with_a_grid() -> None:
    """A grid of 96 cells a pitch, tubes as closed faces, gives the lattice's mobility to 1.5 %."""
    a, b = 2.5, 0.9
    lattice = da.lattice_mobility(**_layout(a, b, 1.0))[0]
    assert _finite_difference_mobility(a, b, 96) == pytest.approx(lattice, rel=0.015)


@settings(deadline=None)
@given(a=st.floats(1.0, 20.0), b=st.floats(0.1, 20.0), staggered=st.sampled_from([0.0, 1.0]))
def test_lattice_speed_is_below_that_of_the_gas_for_any_bank(a: float, b: float, staggered: float) -> None:
    """Tubes slow the wave, whatever the pitches; impossible pitches still give a number."""
    ratio = da.lattice_speed_ratio(**_layout(a, b, staggered))[0]
    assert np.isfinite(ratio)
    assert 0.0 < ratio < 1.0 or smallest_pitch_ratio(np.array(a), np.array(b), np.array(staggered)) < 1.0


def test_bank_of_finite_depth_solves_its_equation() -> None:
    """An independent root finder on the equation of the trapped wave, equal and unequal pitches."""
    c, width, depth, order = 374.771, 2.0, 1.0, 2.0
    for share, across, along in ((0.226694, None, None), (0.3, 0.45, 0.62)):
        my = (1.0 - share) / (1.0 + share) if across is None else across
        mx = my if along is None else along
        ky = order * np.pi / width

        def residual(w: float, share: float = share, my: float = my, mx: float = mx, ky: float = ky) -> float:
            kx = np.sqrt(max((w * w / c**2 * (1.0 - share) - my * ky**2) / mx, 0.0))
            kap = np.sqrt(max(ky**2 - w * w / c**2, 0.0))
            return float(mx * kx * np.sin(0.5 * kx * depth) - kap * np.cos(0.5 * kx * depth))

        root = brentq(residual, ky * c * np.sqrt(my / (1.0 - share)), ky * c, xtol=1e-10)
        found = da.bank_mode(
            order=np.array([order]),
            sound_speed_m_s=np.array([c]),
            width_m=np.array([width]),
            depth_m=np.array([depth]),
            tube_share=np.array([share]),
            mobility_across=None if across is None else np.array([across]),
            mobility_along=None if along is None else np.array([along]),
        )
        assert found[0] == pytest.approx(root / (2.0 * np.pi), rel=1e-10)


def test_bank_mode_lies_between_deep_bank_and_empty_duct() -> None:
    """A thin bank hardly lowers the wave, a very deep one brings it to the bank's own speed."""
    depth = np.array([1e-4, 0.2, 2.0, 200.0])
    f = da.bank_mode(
        order=np.ones(4),
        sound_speed_m_s=np.full(4, 340.0),
        width_m=np.full(4, 2.0),
        depth_m=depth,
        tube_share=np.full(4, 0.3),
    )
    assert np.all(np.diff(f) < 0.0)
    assert f[0] == pytest.approx(85.0, rel=1e-6)
    assert f[-1] == pytest.approx(85.0 / np.sqrt(1.3), rel=1e-3)


def test_coincidence_band_widens_for_dense_and_inline_banks() -> None:
    """0.8-1.2, the lower end 0.7 with fins; 0.6-1.4 in-line, at 60 degrees and below P/D 1.6."""
    low, high = da.coincidence_band(
        pattern=np.array([30, 45, 30, 90, 60]),
        pitch_ratio=np.array([2.0, 2.0, 1.5, 2.0, 2.0]),
        finned=np.array([False, True, False, False, False]),
    )
    assert low.tolist() == [0.8, 0.7, 0.6, 0.6, 0.6]
    assert high.tolist() == [1.2, 1.2, 1.4, 1.4, 1.4]


def test_coincidence_velocity_brings_the_excitation_onto_the_mode() -> None:
    """Excitation goes with velocity; at rest the answer stays finite."""
    mode = np.array([84.0, 168.0])
    velocity = da.coincidence_velocity(
        velocity_m_s=np.array([6.0]), excitation_hz=np.array([63.0]), mode_hz=mode
    )
    np.testing.assert_allclose(velocity, [8.0, 16.0], rtol=1e-14)
    hit = da.coincides(
        excitation_hz=np.array([84.0]), mode_hz=mode, low=np.array([0.8]), high=np.array([1.2])
    )
    assert hit.tolist() == [True, False]
    still = da.coincidence_velocity(velocity_m_s=np.zeros(1), excitation_hz=np.zeros(1), mode_hz=mode)
    assert np.isfinite(still).all()


def test_baffles_raise_the_compartments_above_the_excitation() -> None:
    """The number found keeps the margin, one less does not; without need there is none."""
    for excitation in (20.0, 90.0, 150.0, 400.0):
        n = float(
            da.baffles_needed(
                effective_sound_speed_m_s=np.array([340.0]),
                width_m=np.array([2.0]),
                excitation_hz=np.array([excitation]),
            )[0]
        )
        assert 340.0 * (n + 1.0) / 4.0 >= 1.25 * excitation
        assert n == 0.0 or 340.0 * n / 4.0 < 1.25 * excitation


def test_baffles_leave_neighbouring_compartments_unequal() -> None:
    """Widths fill the duct, and neighbours differ by 7 % so that they share no wave."""
    for baffles in (1, 2, 5):
        at = da.baffle_positions(width_m=2.0, baffles=baffles)
        widths = np.diff(np.concatenate([[0.0], at, [2.0]]))
        assert np.sum(widths) == pytest.approx(2.0, rel=1e-14)
        ratio = widths[:-1] / widths[1:]
        assert np.all(np.abs(np.log(ratio)) > 0.065)
    assert da.baffle_positions(width_m=2.0, baffles=0).size == 0


def test_pressure_nodes_of_the_first_and_third_wave() -> None:
    """The middle for the first; a sixth, a half and five sixths for the third."""
    np.testing.assert_allclose(da.pressure_nodes(width_m=2.0, order=1), [1.0])
    np.testing.assert_allclose(da.pressure_nodes(width_m=3.0, order=3), [0.5, 1.5, 2.5])


def test_second_opinion_and_energy_parameter() -> None:
    """W/(n (SL - D)) and M dp by hand."""
    g = da.grotz_arnold_parameter(
        width_m=np.array([2.0]),
        order=np.array([2.0]),
        longitudinal_pitch_m=np.array([0.05]),
        diameter_m=np.array([0.03]),
    )
    assert g[0] == pytest.approx(50.0, rel=1e-12)
    m = da.energy_parameter(
        gap_velocity_m_s=np.array([17.0]),
        sound_speed_m_s=np.array([340.0]),
        pressure_drop_pa=np.array([400.0]),
    )
    assert m[0] == pytest.approx(20.0, rel=1e-12)


def test_lattice_and_slab_of_a_bank_do_not_depend_on_the_others() -> None:
    """Alone and beside others, every bit is the same."""
    rng = np.random.default_rng(3)
    a, b = rng.uniform(1.2, 4.0, 40), rng.uniform(1.2, 4.0, 40)
    s = rng.integers(0, 2, 40).astype(float)
    both = {"transverse_pitch_ratio": a, "longitudinal_pitch_ratio": b, "arrangement": s}
    together = da.lattice_speed_ratio(**both)
    wave = {
        "order": np.ones(40),
        "sound_speed_m_s": np.full(40, 340.0),
        "width_m": rng.uniform(1.0, 5.0, 40),
        "depth_m": rng.uniform(0.1, 4.0, 40),
        "tube_share": 0.25 * np.pi / (a * b),
    }
    modes = da.bank_mode(**wave)
    for i in range(40):
        own = slice(i, i + 1)
        assert da.lattice_speed_ratio(**{k: v[own] for k, v in both.items()})[0] == together[i]
        assert da.bank_mode(**{k: v[own] for k, v in wave.items()})[0] == modes[i]


def test_every_law_and_criterion_states_its_source() -> None:
    """Slugs are unique; the second opinion stands beside the verdict, with its caution."""
    slugs = [law.slug for law in da.LAWS]
    assert len(set(slugs)) == len(slugs)
    assert all(law.attribution for law in da.LAWS)
    assert all(c.caution for c in da.CRITERIA)
