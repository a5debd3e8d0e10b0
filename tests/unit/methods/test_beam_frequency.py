"""Natural frequencies and mode shapes against exact solutions."""

import importlib.util
import sys
from pathlib import Path
from types import ModuleType

import numpy as np
import pytest
from numpy.typing import NDArray

from crossbank_service.methods import beam_frequency as bf

STIFFNESS = 190e9 * np.pi / 64.0 * (0.0508**4 - (0.0508 - 0.0061) ** 4)
MASS = 5.05271


def _beside(name: str) -> ModuleType:
    """Load a generator of the reference folder."""
    path = Path(__file__).parents[2] / "reference" / f"{name}.py"
    spec = importlib.util.spec_from_file_location(name, path)
    assert spec is not None
    assert spec.loader is not None
    module = importlib.util.module_from_spec(spec)
    sys.modules[name] = module
    spec.loader.exec_module(module)
    return module


exact = _beside("exact_beams")
bends = _beside("generate_u_bends")


def _modes(spans: list[list[float]], ends: int, force: float = 0.0, modes: int = 4) -> bf.Modes:
    array = np.array(spans)
    n = len(array)
    return bf.tube_modes(
        spans_m=array,
        stiffness_n_m2=np.full(n, STIFFNESS),
        mass_kg_m=np.full(n, MASS),
        ends=np.full(n, ends),
        axial_force_n=np.full(n, force),
        modes=modes,
    )


@pytest.mark.parametrize(
    ("ends", "fixed"),
    [(bf.PINNED, (False, False)), (bf.FIXED_PINNED, (True, False)), (bf.FIXED, (True, True))],
)
@pytest.mark.parametrize("force", [0.0, -25e3, 40e3])
@pytest.mark.parametrize("spans", [[1.8], [1.0, 1.8, 1.3], [0.6, 1.1, 0.9, 1.4, 0.7]])
def test_elements_agree_with_the_exact_determinant(
    ends: int, fixed: tuple[bool, bool], force: float, spans: list[float]
) -> None:
    """Unequal spans, either end and axial force: the lowest four modes to 0.05 %, never below the exact."""
    wanted = np.array(
        exact.exact_frequencies(spans, STIFFNESS, MASS, fixed=fixed, axial_force=force, modes=4)
    )
    got = _modes([spans], ends, force).frequency_hz[0]
    assert np.all(got >= wanted * (1.0 - 1e-8))
    np.testing.assert_allclose(got, wanted, rtol=5e-4)


def test_printed_frequencies_of_three_unequal_spans() -> None:
    """Values calculated elsewhere, to the digits printed, by the elements and by the exact determinant."""
    spans = [1.0, 1.8, 1.3]
    for ends, fixed, force, printed in (
        (bf.FIXED, (True, True), 0.0, [53.455, 118.888]),
        (bf.PINNED, (False, False), 0.0, [48.522]),
        (bf.FIXED, (True, True), -40e3, [46.489]),
    ):
        n = len(printed)
        sure = exact.exact_frequencies(spans, STIFFNESS, MASS, fixed=fixed, axial_force=force, modes=n)
        assert sure == pytest.approx(printed, abs=5e-4)
        assert _modes([spans], ends, force, modes=10).frequency_hz[0, :n] == pytest.approx(printed, abs=7e-4)


def test_equal_spans_follow_the_periodic_beam() -> None:
    """One to eight equal spans give the table's lambda for every kind of ends."""
    for ends in (bf.PINNED, bf.FIXED_PINNED, bf.FIXED):
        for count in (1, 2, 3, 5, 8):
            lam = bf.equal_span_eigenvalue(np.array([float(count)]), np.array([ends]))[0]
            wanted = lam**2 / (2.0 * np.pi) * np.sqrt(STIFFNESS / MASS)
            assert _modes([[1.0] * count], ends).frequency_hz[0, 0] == pytest.approx(wanted, rel=1e-4)


def test_cantilever_and_ten_modes_of_one_span() -> None:
    """The free end vibrates at 1.8751^2, and the tenth mode of one pinned span is (10 pi)^2 to 0.1 %."""
    base = np.sqrt(STIFFNESS / MASS) / (2.0 * np.pi)
    assert _modes([[1.0]], bf.FIXED_FREE).frequency_hz[0, 0] == pytest.approx(1.875104**2 * base, rel=1e-5)
    ten = _modes([[1.0]], bf.PINNED, modes=10).frequency_hz[0]
    np.testing.assert_allclose(ten, (np.arange(1, 11) * np.pi) ** 2 * base, rtol=1e-3)


def test_pinned_shape_has_its_closed_form_integrals() -> None:
    """sin(k pi x/L): mean square L/2, mean modulus 2 L/pi, largest displacement 1, whatever the mode."""
    modes = _modes([[1.3]], bf.PINNED)
    np.testing.assert_allclose(np.sum(modes.squared_m[0], axis=(-1, -2)), 0.65, rtol=2e-3)
    np.testing.assert_allclose(np.sum(modes.absolute_m[0], axis=(-1, -2)), 2.6 / np.pi, rtol=3e-3)
    np.testing.assert_allclose(modes.modal_mass_m, np.sum(modes.squared_m, axis=(-1, -2)), rtol=1e-14)
    sine = np.sin(np.pi * np.linspace(0.0, 1.0, 9))
    np.testing.assert_allclose(np.abs(modes.shape[0, 0, 0]), sine, atol=1e-4)


def test_lowest_mode_of_two_pinned_spans_is_antisymmetric() -> None:
    """Both spans carry half of the mode."""
    modes = _modes([[1.0, 1.0]], bf.PINNED)
    shares = np.sum(modes.squared_m[0, 0], axis=-1)
    assert shares[0] == pytest.approx(shares[1], rel=1e-6)
    assert modes.shape[0, 0, 0, 4] == pytest.approx(-modes.shape[0, 0, 1, 4], rel=1e-6)


def test_a_tube_beside_others_keeps_every_bit() -> None:
    """Span counts, ends, forces and padding of the neighbours change no bit of a tube's result."""
    rng = np.random.default_rng(5)
    n, most = 23, 9
    spans = rng.uniform(0.3, 2.0, (n, most))
    for i in range(n):
        spans[i, 1 + i % most :] = 0.0
    ends = rng.integers(0, 4, n)
    data: dict[str, NDArray[np.float64]] = {
        "stiffness_n_m2": rng.uniform(1e3, 3e4, n),
        "mass_kg_m": rng.uniform(1.0, 6.0, n),
        "axial_force_n": rng.uniform(-3e3, 3e4, n),
    }
    ratio = rng.uniform(1.0, 2.0, (n, most))
    together = bf.tube_modes(spans_m=spans, ends=ends, mass_ratio=ratio, modes=6, **data)
    for i in range(n):
        used = 1 + i % most
        only = slice(i, i + 1)
        own = {key: values[only] for key, values in data.items()}
        mass_ratio = ratio[only, :used]
        alone = bf.tube_modes(
            spans_m=spans[only, :used], ends=ends[only], mass_ratio=mass_ratio, modes=6, **own
        )
        assert np.array_equal(alone.frequency_hz[0], together.frequency_hz[i])
        assert np.array_equal(alone.modal_mass_m[0], together.modal_mass_m[i])
        assert np.array_equal(alone.squared_m[0], together.squared_m[i, :, :used])
        assert np.array_equal(alone.absolute_m[0], together.absolute_m[i, :, :used])
        assert np.array_equal(alone.shape[0], together.shape[i, :, :used])


def test_buckled_tube_has_no_frequency_and_says_so() -> None:
    """Beyond the Euler load of a pinned span the lowest frequency is 0 and the tube is not stable."""
    euler = np.pi**2 * STIFFNESS / 1.8**2
    below, above = _modes([[1.8]], bf.PINNED, -0.99 * euler), _modes([[1.8]], bf.PINNED, -1.01 * euler)
    assert below.stable[0]
    assert below.frequency_hz[0, 0] > 0.0
    assert not above.stable[0]
    assert above.frequency_hz[0, 0] == 0.0
    assert np.all(np.isfinite(above.modal_mass_m))


def test_heavier_span_lowers_the_frequency_like_a_heavier_tube() -> None:
    """A mass ratio of four in every span halves all frequencies."""
    spans = np.array([[0.9, 1.2]])
    one = np.ones(1)
    plain, heavy = (
        bf.tube_modes(
            spans_m=spans,
            stiffness_n_m2=one,
            mass_kg_m=one,
            ends=np.array([bf.FIXED]),
            axial_force_n=0.0 * one,
            mass_ratio=np.full((1, 2), ratio),
        )
        for ratio in (1.0, 4.0)
    )
    np.testing.assert_allclose(heavy.frequency_hz, 0.5 * plain.frequency_hz, rtol=1e-9)
    np.testing.assert_allclose(heavy.modal_mass_m, 4.0 * plain.modal_mass_m, rtol=1e-9)


def test_axial_factor_of_built_in_spans_errs_as_stated() -> None:
    """At half the critical load the form is 0.6 and 0.8 % low, at all of it in tension 0.9 and 1.3 high."""
    for ends, k, low, high in ((bf.FIXED_PINNED, 0.69916, -0.6, 0.9), (bf.FIXED, 0.5, -0.8, 1.3)):
        critical = np.pi**2 * STIFFNESS / (k * 1.8) ** 2
        for share, percent in ((-0.5, low), (1.0, high)):
            element = _modes([[1.8]], ends, share * critical).frequency_hz[0, 0]
            closed = bf.single_span_frequency(
                length_m=np.array([1.8]),
                stiffness_n_m2=np.array([STIFFNESS]),
                mass_kg_m=np.array([MASS]),
                ends=np.array([ends]),
                axial_force_n=np.array([share * critical]),
            )[0]
            assert 100.0 * (closed / element - 1.0) == pytest.approx(percent, abs=0.06)


def test_equal_spans_needed_is_the_smallest_number_that_does() -> None:
    """The number found reaches the frequency in the element model, one less does not."""
    wanted = 60.0
    count = bf.equal_spans_needed(
        required_frequency_hz=np.array([wanted]),
        total_length_m=np.array([6.0]),
        stiffness_n_m2=np.array([STIFFNESS]),
        mass_kg_m=np.array([MASS]),
        ends=np.array([bf.FIXED]),
        axial_force_n=np.zeros(1),
    )
    n = int(count[0])
    assert _modes([[6.0 / n] * n], bf.FIXED).frequency_hz[0, 0] >= wanted
    assert _modes([[6.0 / (n - 1)] * (n - 1)], bf.FIXED).frequency_hz[0, 0] < wanted


def test_every_second_support_absent_joins_spans_in_pairs() -> None:
    """An odd last span stays by itself."""
    joined = bf.without_alternate_supports(np.array([[1.0, 0.5, 0.7], [0.4, 0.6, 0.0]]))
    np.testing.assert_allclose(joined, [[1.5, 0.7], [1.0, 0.0]])


def test_span_frequencies_take_each_span_on_pins() -> None:
    """(pi/L)^2 for a present span, something out of the way for an absent one."""
    f = bf.span_frequencies(
        spans_m=np.array([[1.0, 2.0, 0.0]]),
        stiffness_n_m2=np.ones(1),
        mass_kg_m=np.ones(1),
        axial_force_n=np.zeros(1),
    )
    np.testing.assert_allclose(f[0, :2], [0.5 * np.pi, 0.125 * np.pi], rtol=1e-14)
    assert f[0, 2] > 1e5


def test_u_bend_table_is_that_of_the_generator_and_of_the_ring() -> None:
    """Between and at the nodes the frame of straight elements agrees; without legs Love's ring does."""
    for leg in (0.0, 0.5, 1.1, 2.0, 3.9):
        out, inside = bf.u_bend_frequency(
            bend_radius_m=np.ones(1),
            leg_length_m=np.array([leg]),
            stiffness_n_m2=np.ones(1),
            mass_kg_m=np.ones(1),
        )
        for value, in_plane in ((out, False), (inside, True)):
            wanted = bends.converged(leg, in_plane=in_plane, elements=16) / (2.0 * np.pi)
            assert value[0] == pytest.approx(wanted, rel=4e-3)
    # Roots of the sixth-order equations of a clamped semicircle, Poisson's ratio 0.3, found to nine digits.
    out, inside = bf.u_bend_frequency(
        bend_radius_m=np.ones(1), leg_length_m=np.zeros(1), stiffness_n_m2=np.ones(1), mass_kg_m=np.ones(1)
    )
    assert 2.0 * np.pi * out[0] == pytest.approx(1.819343977, abs=1e-4)
    assert 2.0 * np.pi * inside[0] == pytest.approx(4.384429997, abs=1e-4)


def test_long_legs_extend_the_u_bend_on_the_low_side() -> None:
    """Beyond the table the frequency is below that of the frame, and falls steadily."""
    values = []
    for leg in (4.0, 5.0, 6.0):
        out, inside = bf.u_bend_frequency(
            bend_radius_m=np.ones(1),
            leg_length_m=np.array([leg]),
            stiffness_n_m2=np.ones(1),
            mass_kg_m=np.ones(1),
        )
        values.append(out[0])
        assert 2.0 * np.pi * out[0] <= 1.001 * bends.converged(leg, in_plane=False, elements=12)
        assert 2.0 * np.pi * inside[0] <= 1.001 * bends.converged(leg, in_plane=True, elements=12)
    assert values[0] > values[1] > values[2] > 0.0
