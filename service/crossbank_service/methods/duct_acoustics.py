"""Standing waves across a duct with a tube bank: modes, what excites them, whether they are damped, baffles.

Arrays broadcast together; where modes are listed their order n is the last axis, so values of the case
enter as (N, 1).
"""

from functools import cache
from math import comb, factorial

import numpy as np
from numpy.typing import NDArray
from scipy.special import zeta

from crossbank_service.methods._layout import is_staggered
from crossbank_service.methods.criterion import Criterion
from crossbank_service.methods.record import Array, Limit
from crossbank_service.methods.tube_section import INLINE, ROTATED_TRIANGLE, Law, smallest_pitch_ratio

Patterns = NDArray[np.int64]
Mask = NDArray[np.bool_]

GAS_CONSTANT = 8.314462618
REFERENCE_SOUND_PRESSURE_PA = 20e-6
PSI_UNIFORM_FLOW, PSI_BOILER_BANK = 600.0, 2000.0
GROTZ_ARNOLD_LOW, GROTZ_ARNOLD_HIGH = 62.0, 68.0
OPERATING_HEADROOM = 1.2
BAFFLE_FREQUENCY_MARGIN = 1.25
UNEVENNESS = 0.07
SECOND_LINE_BAND = 0.20
_MULTIPOLES = 7
_LATTICE_TERMS = 100


def sound_speed(*, heat_capacity_ratio: Array, molar_mass_kg_mol: Array, temperature_k: Array) -> Array:
    """Speed of sound of the gas, c = sqrt(gamma R T/M) [m/s]."""
    return np.sqrt(heat_capacity_ratio * GAS_CONSTANT * temperature_k / molar_mass_kg_mol)


def tube_share(*, diameter_m: Array, transverse_pitch_m: Array, longitudinal_pitch_m: Array) -> Array:
    """Share of the bank's volume that is tubes, pi D^2/(4 ST SL) [-]; finned: D of the metal's volume."""
    return 0.25 * np.pi * diameter_m**2 / (transverse_pitch_m * longitudinal_pitch_m)


def parker_speed_ratio(share: Array) -> Array:
    """Speed of sound across a bank over that of the gas, 1/sqrt(1 + sigma) [-].

    Notes
    -----
    Parker, J. Sound Vib. 57 (1978); Blevins 1986. Exact to 1.5 % for equal pitches; up to 12 % high with ST
    > SL and as much low with ST < SL: ``lattice_speed_ratio`` has the pitches in it.
    """
    return 1.0 / np.sqrt(1.0 + share)


def lattice_mobility(
    *, transverse_pitch_ratio: Array, longitudinal_pitch_ratio: Array, arrangement: Array
) -> Array:
    """Inverse effective density of gas that swings across a bank over that of free gas [-], per case.

    Parameters
    ----------
    transverse_pitch_ratio, longitudinal_pitch_ratio, arrangement : Array
        a, b [-]; 1 staggered, 0 in-line. Any common shape. For the direction of flow give b
        and a of an in-line bank, 2b and a/2 of a staggered one.

    Notes
    -----
    Potential flow through the doubly periodic array of rigid cylinders, the conduction problem of Rayleigh
    (Phil. Mag. 34, 1892) with ``_MULTIPOLES`` odd multipoles and the lattice sums of the real pitches.
    Square lattice to first order: (1 - sigma)/(1 + sigma).
    """
    a, b, staggered = np.broadcast_arrays(
        transverse_pitch_ratio, longitudinal_pitch_ratio, is_staggered(arrangement)
    )
    # Tubes that overlap have no lattice: solved as a wide bank, answered by the closed form.
    real = smallest_pitch_ratio(a, b, np.where(staggered, 1.0, 0.0)) >= 1.0
    share = 0.25 * np.pi / (a * b)
    a, b = np.where(real, a, 2.0), np.where(real, b, 2.0)
    ratio = b / a
    nome = np.exp(-2.0 * np.pi * ratio) * np.where(staggered, -1.0, 1.0)
    radius = 0.5 / a
    orders = [2 * i + 1 for i in range(_MULTIPOLES)]
    sums = _lattice_sums(nome, 4 * _MULTIPOLES - 2)
    matrix = np.zeros((*a.shape, _MULTIPOLES, _MULTIPOLES))
    for i, n in enumerate(orders):
        for j, m in enumerate(orders):
            matrix[..., i, j] = comb(m + n - 1, n) * sums[m + n] * radius ** (m + n) + (n == m)
    load = np.zeros((*a.shape, _MULTIPOLES, 1))
    load[..., 0, 0] = 1.0
    dipole = np.linalg.solve(matrix, load)[..., 0, 0]
    free = np.maximum(1.0 - share, 0.0)
    return np.asarray(np.where(real, 1.0 - 2.0 * share * dipole, free / (1.0 + share)))


def lattice_speed_ratio(
    *, transverse_pitch_ratio: Array, longitudinal_pitch_ratio: Array, arrangement: Array
) -> Array:
    """Speed of sound across a bank over that of the gas, low frequencies, any pitches [-].

    Notes
    -----
    sqrt(mobility/(1 - sigma)): density by the lattice of cylinders, compressibility by the free volume.
    """
    mobility = lattice_mobility(
        transverse_pitch_ratio=transverse_pitch_ratio,
        longitudinal_pitch_ratio=longitudinal_pitch_ratio,
        arrangement=arrangement,
    )
    share = 0.25 * np.pi / (transverse_pitch_ratio * longitudinal_pitch_ratio)
    return np.sqrt(np.maximum(mobility, 1e-6) / np.maximum(1.0 - share, 1e-6))


def _lattice_sums(nome: Array, highest: int) -> dict[int, Array]:
    """Lattice sums of w^-k, real period 1, k = 2, 4, ..., taken along the swing first (Eisenstein)."""
    n = np.arange(1, _LATTICE_TERMS + 1)
    sums = {}
    for k in range(2, highest + 1, 2):
        series = np.zeros_like(nome)
        for term in n[::-1].tolist():
            power = nome**term
            series = series + float(term) ** (k - 1) * power / (1.0 - power)
        sums[k] = 2.0 * _zeta(k) + 2.0 * (-1.0) ** (k // 2) * (2.0 * np.pi) ** k / factorial(k - 1) * series
    return sums


@cache
def _zeta(k: int) -> float:
    return float(zeta(k))


def duct_mode(*, order: Array, sound_speed_m_s: Array, width_m: Array) -> Array:
    """Frequency of the n-th standing wave across a width, n c/(2 W) [Hz]: c free, or c_eff in a deep bank."""
    return order * sound_speed_m_s / (2.0 * width_m)


def bank_mode(
    *,
    order: Array,
    sound_speed_m_s: Array,
    width_m: Array,
    depth_m: Array,
    tube_share: Array,
    mobility_across: Array | None = None,
    mobility_along: Array | None = None,
) -> Array:
    """Frequency of the n-th wave across a bank of finite depth in a long empty duct [Hz].

    Parameters
    ----------
    order, sound_speed_m_s, width_m : Array
        n [-], c of the gas [m/s], duct width W across the tubes [m].
    depth_m : Array
        Rows times longitudinal pitch, B [m].
    tube_share : Array
        sigma [-].
    mobility_across, mobility_along : Array, optional
        Inverse effective density across and along the flow [-]; left out: (1 - sigma)/(1 + sigma), equal
        pitches.

    Notes
    -----
    The lowest even wave trapped at the bank: M_x kx tan(kx B/2) = kap with M_x kx^2 = w^2 (1 - sigma)/c^2 -
    M_y ky^2, ky = n pi/W, kap^2 = ky^2 - w^2/c^2. It lies between the waves of the deep bank and of the
    empty duct. Bisection.
    """
    isotropic = (1.0 - tube_share) / (1.0 + tube_share)
    across = isotropic if mobility_across is None else mobility_across
    along = isotropic if mobility_along is None else mobility_along
    ky = order * np.pi / width_m
    free = 1.0 - tube_share
    # In units of the empty duct's wave: x = w/(ky c); x^2 runs from that of the deep bank to 1.
    low, high = np.broadcast_arrays(across / free, np.ones_like(ky * depth_m))
    low = low + 0.0
    for _ in range(60):
        mid = 0.5 * (low + high)
        kx = ky * np.sqrt(np.maximum(mid * free - across, 0.0) / along)
        phase = 0.5 * kx * depth_m
        kap = ky * np.sqrt(1.0 - mid)
        quarter = 0.5 * np.pi
        inside = np.minimum(phase, quarter)
        too_high = (phase >= quarter) | (along * kx * np.sin(inside) > kap * np.cos(inside))
        low, high = np.where(too_high, low, mid), np.where(too_high, mid, high)
    empty = duct_mode(order=order, sound_speed_m_s=sound_speed_m_s, width_m=width_m)
    return np.asarray(empty * np.sqrt(0.5 * (low + high)))


def owen_frequency(
    *, gap_velocity_m_s: Array, diameter_m: Array, transverse_pitch_m: Array, longitudinal_pitch_m: Array
) -> Array:
    """Peak of turbulence in a bank, U D/(ST SL) (3.05 (1 - D/ST)^2 + 0.28) [Hz] (Owen 1965, from memory)."""
    base = gap_velocity_m_s * diameter_m / (transverse_pitch_m * longitudinal_pitch_m)
    return base * (3.05 * (1.0 - diameter_m / transverse_pitch_m) ** 2 + 0.28)


def inline_second_frequency(
    *, gap_velocity_m_s: Array, diameter_m: Array, longitudinal_pitch_m: Array
) -> Array:
    """Acoustic line of in-line banks, U_gap/(2 SL - D) [Hz], +-20 % (Grotz & Arnold 1956, from memory)."""
    return gap_velocity_m_s / (2.0 * longitudinal_pitch_m - diameter_m)


def coincidence_band(*, pattern: Patterns, pitch_ratio: Array, finned: Mask) -> tuple[Array, Array]:
    """Lower and upper ends of f_exc/f_mode that count as coincidence [-].

    Notes
    -----
    0.8-1.2 for 30 and 45 degrees (boiler practice); 0.6-1.4 in-line, at 60 degrees and for any bank below
    P/D 1.6 (rule of this service: acoustic Strouhal numbers of these differ from those of shedding, Ziada &
    Oengoren 2000). Finned: lower end 0.7 or less, since resonance starts at a lower velocity (Alziadeh &
    Mohany 2022).
    """
    wide = (pattern == INLINE) | (pattern == ROTATED_TRIANGLE) | (pitch_ratio < 1.6)
    low = np.where(wide, 0.6, np.where(finned, 0.7, 0.8))
    return low, np.where(wide, 1.4, 1.2)


def coincides(*, excitation_hz: Array, mode_hz: Array, low: Array, high: Array) -> Mask:
    """Whether an excitation lies in the coincidence band of a mode."""
    return (excitation_hz >= low * mode_hz) & (excitation_hz <= high * mode_hz)


def coincidence_velocity(*, velocity_m_s: Array, excitation_hz: Array, mode_hz: Array) -> Array:
    """Velocity at which an excitation meets a mode, U f_mode/f_exc [m/s]: excitation goes with velocity.

    Notes
    -----
    Every one below ``OPERATING_HEADROOM`` times the largest operating velocity counts (rule of this
    service). At rest the answer is held finite.
    """
    return velocity_m_s * mode_hz / np.maximum(excitation_hz, 1e-9)


def chen_damping_parameter(
    *,
    reynolds: Array,
    strouhal: Array,
    transverse_pitch_ratio: Array,
    longitudinal_pitch_ratio: Array,
    arrangement: Array,
) -> Array:
    """Resonance parameter Psi = (Re/S) ((xL - 1)/xL)^2/xT [-].

    Parameters
    ----------
    reynolds, strouhal : Array
        Re and S on the gap velocity and D [-]; the smallest S of its band gives the cautious, largest Psi.
    transverse_pitch_ratio, longitudinal_pitch_ratio, arrangement : Array
        xT = a; xL = b in-line, 2b staggered [-].

    Notes
    -----
    Y. N. Chen, J. Eng. Ind. 90 (1968), from memory. Sound above 600 in uniform flow, above about 2000 in
    the uneven flow of boiler banks (Chen & Young, J. Eng. Ind. 96 (1974) 1072); a uniform duct stays at
    600.
    """
    x = np.where(is_staggered(arrangement), 2.0, 1.0) * longitudinal_pitch_ratio
    return reynolds / strouhal * ((x - 1.0) / x) ** 2 / transverse_pitch_ratio


def grotz_arnold_parameter(
    *, width_m: Array, order: Array, longitudinal_pitch_m: Array, diameter_m: Array
) -> Array:
    """W/(n (SL - D)) [-] of in-line banks: below 62-68, with coincidence, resonance (from memory)."""
    return width_m / (order * np.maximum(longitudinal_pitch_m - diameter_m, 1e-6))


def energy_parameter(*, gap_velocity_m_s: Array, sound_speed_m_s: Array, pressure_drop_pa: Array) -> Array:
    """Mach number in the gaps times the pressure drop of the bank, M dp [Pa]; reported, no public limit."""
    return gap_velocity_m_s / sound_speed_m_s * pressure_drop_pa


def blevins_bressler_pressure(
    *, approach_velocity_m_s: Array, sound_speed_m_s: Array, pressure_drop_pa: Array
) -> Array:
    """Sound pressure at resonance, 12.5 (U_u/c) dp [Pa] rms (Blevins & Bressler 1993, from memory).

    Notes
    -----
    Too low for low modes of wide ducts (Feenstra, Weaver & Eisinger 2006): a measure of severity, never a
    clearance.
    """
    return 12.5 * approach_velocity_m_s / sound_speed_m_s * pressure_drop_pa


def sound_level(sound_pressure_pa: Array) -> Array:
    """Sound pressure level, 20 log10(p/20 uPa) [dB], held at 0 for silence."""
    return 20.0 * np.log10(np.maximum(sound_pressure_pa / REFERENCE_SOUND_PRESSURE_PA, 1.0))


def baffles_needed(
    *,
    effective_sound_speed_m_s: Array,
    width_m: Array,
    excitation_hz: Array,
    margin: float = BAFFLE_FREQUENCY_MARGIN,
) -> Array:
    """Smallest number of baffles whose compartments resonate above the highest excitation [-].

    Notes
    -----
    Smallest N with c_eff (N + 1)/(2 W) >= 1.25 f_exc (rule of this service). Full depth of the bank and a
    little beyond both faces: a part-depth baffle let the second mode return in the open part.
    """
    compartments = margin * excitation_hz * 2.0 * width_m / effective_sound_speed_m_s
    return np.maximum(np.ceil(compartments * (1.0 - 1e-12)) - 1.0, 0.0)


def baffle_positions(*, width_m: float, baffles: int, unevenness: float = UNEVENNESS) -> Array:
    """Distances of baffles from the wall of one duct [m], neighbouring compartments of unequal width.

    Notes
    -----
    Neighbouring widths differ by ``unevenness`` (5-10 %, common practice); one baffle stands off the middle.
    """
    shares = 1.0 + 0.5 * unevenness * np.where(np.arange(baffles + 1) % 2 == 0, 1.0, -1.0)
    return np.asarray(width_m * np.cumsum(shares[:-1]) / np.sum(shares), dtype=np.float64)


def pressure_nodes(*, width_m: float, order: int) -> Array:
    """Where the n-th wave has its pressure nodes, (2k - 1) W/(2n), k = 1..n [m]: a baffle there stops it."""
    return np.asarray(width_m * (2.0 * np.arange(1, order + 1) - 1.0) / (2.0 * order), dtype=np.float64)


def compartment_mode(
    *, effective_sound_speed_m_s: Array, width_m: Array, baffles: Array, unevenness: float = UNEVENNESS
) -> Array:
    """Lowest wave of the widest compartment between baffles [Hz]."""
    widest = width_m / (baffles + 1.0) * np.where(baffles > 0.0, 1.0 + 0.5 * unevenness, 1.0)
    return effective_sound_speed_m_s / (2.0 * widest)


_CAUTION = (
    "Acoustic predictions miss: leave room for baffles. Above 130 dB casings can crack and hearing suffers."
)

_NEEDS = ("duct width", "pitches", "gas state")

LAWS = (
    Law(
        slug="rayleigh-1892",
        check="duct-acoustics",
        gives="speed of sound across the bank over that of the gas",
        function=lattice_speed_ratio,
        source="Rayleigh, Phil. Mag. 34 (1892) 481, lattice of rigid cylinders",
        trust="derived",
        limits=(Limit(quantity="transverse_pitch_ratio", at_least=1.1),),
        doubt="Low frequencies: the wave is long against the pitches.",
    ),
    Law(
        slug="parker-1978",
        check="duct-acoustics",
        gives="speed of sound across the bank over that of the gas",
        function=parker_speed_ratio,
        source="Parker, J. Sound Vib. 57 (1978); Blevins 1986",
        trust="derived",
        governs=False,
        doubt="Equal pitches only: up to 12 % wrong otherwise.",
    ),
    Law(
        slug="owen-1965",
        check="duct-acoustics",
        gives="frequency of the turbulence peak",
        unit="Hz",
        function=owen_frequency,
        source="Owen, J. Mech. Eng. Sci. 7 (1965)",
        trust="memory",
        velocity="gap",
    ),
    Law(
        slug="grotz-arnold-1956-line",
        check="duct-acoustics",
        gives="frequency of the second acoustic line",
        unit="Hz",
        function=inline_second_frequency,
        source="Grotz & Arnold 1956",
        trust="consistent",
        patterns=(INLINE,),
        velocity="gap",
        doubt="Within 20 %.",
    ),
    Law(
        slug="blevins-bressler-1993",
        check="duct-acoustics",
        gives="sound pressure at resonance",
        unit="Pa",
        function=blevins_bressler_pressure,
        source="Blevins & Bressler, J. Sound Vib. 164 (1993) 503",
        trust="memory",
        governs=False,
        velocity="approach",
        doubt="Too low for low modes of wide ducts; never a clearance.",
    ),
)

RESONANCE = Criterion(
    slug="chen-1968",
    check="duct-acoustics",
    quantity="resonance parameter where an excitation meets a mode",
    unit="",
    sense="at-most",
    near=PSI_UNIFORM_FLOW,
    beyond=PSI_BOILER_BANK,
    source="Y. N. Chen, J. Eng. Ind. 90 (1968); limits Chen & Young, J. Eng. Ind. 96 (1974) 1072",
    trust="consistent",
    needs=_NEEDS,
    caution=_CAUTION,
)
SECOND_OPINION = Criterion(
    slug="grotz-arnold-1956",
    check="duct-acoustics",
    quantity="width over order and longitudinal gap, in-line, where an excitation meets a mode",
    unit="",
    sense="at-least",
    near=GROTZ_ARNOLD_HIGH,
    beyond=GROTZ_ARNOLD_LOW,
    source="Grotz & Arnold 1956; neither clears nor softens a verdict",
    trust="memory",
    needs=_NEEDS,
    caution=_CAUTION,
)
CRITERIA = (RESONANCE, SECOND_OPINION)
