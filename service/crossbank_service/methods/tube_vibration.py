"""What the outside stream does to a tube: vortex shedding, turbulence buffeting.

Arrays of one criterion broadcast together. Results per mode have shape (N, M), cells of a mode (N, M, S, 8)
as ``beam_frequency.Modes`` gives them, velocities along the tube (N, S) or (N, S, 8).
"""

import numpy as np
from numpy.typing import NDArray

from crossbank_service.methods._layout import free_area_ratio
from crossbank_service.methods.beam_frequency import over_spans
from crossbank_service.methods.criterion import BEYOND, NEAR, WITHIN, Codes, Criterion
from crossbank_service.methods.record import Array, Limit
from crossbank_service.methods.tube_section import (
    INLINE,
    NORMAL_TRIANGLE,
    ROTATED_SQUARE,
    ROTATED_TRIANGLE,
    Law,
    smallest_pitch_ratio,
)

Patterns = NDArray[np.int64]
Mask = NDArray[np.bool_]

SINGLE_CYLINDER_STROUHAL = 0.2
LOCK_IN_SEPARATION = 0.3
QUIET_REDUCED_DAMPING = 64.0
LOCK_IN_AMPLITUDE_SHARE = 0.02
DENSE_GAS_KG_M3 = 5.0
ORDINARY_VELOCITY_PEAK = 1.2
BUFFETING_LIMIT_M, BUFFETING_LIMIT_SHARE = 0.25e-3, 0.01
_LEAST_HZ = 1e-3
_LEAST_M_S = 1e-9


def gap_velocity_ratio(
    *, transverse_pitch_ratio: Array, longitudinal_pitch_ratio: Array, arrangement: Array
) -> Array:
    """Velocity in the narrowest section over the approach velocity, U_gap/U_u [-] (Zukauskas' section)."""
    return 1.0 / free_area_ratio(transverse_pitch_ratio, longitudinal_pitch_ratio, arrangement)


def pitch_velocity_ratio(
    *, transverse_pitch_ratio: Array, longitudinal_pitch_ratio: Array, arrangement: Array
) -> Array:
    """Pitch velocity over the approach velocity, U_p/U_u [-].

    Notes
    -----
    The larger of (P/D)/(P/D - 1), P the smallest distance between tubes, and the ratio of the narrowest
    section. For the normal triangle and the square both agree; for 45 and 60 degrees the first is the
    larger. With unequal pitches the choice is a rule of this service and cautious, most so in-line with the
    longitudinal pitch the smaller.
    """
    p = smallest_pitch_ratio(transverse_pitch_ratio, longitudinal_pitch_ratio, arrangement)
    gap = gap_velocity_ratio(
        transverse_pitch_ratio=transverse_pitch_ratio,
        longitudinal_pitch_ratio=longitudinal_pitch_ratio,
        arrangement=arrangement,
    )
    return np.maximum(gap, p / np.maximum(p - 1.0, 0.01))


def shedding_strouhal(
    *, transverse_pitch_ratio: Array, longitudinal_pitch_ratio: Array, arrangement: Array, pattern: Patterns
) -> Array:
    """Strouhal number of vortex shedding on the approach velocity, S_u = f D/U_u [-].

    Parameters
    ----------
    transverse_pitch_ratio, longitudinal_pitch_ratio, arrangement : Array
        a, b [-] on the diameter that sheds (De_f of finned tubes); 1 staggered, 0 in-line.
    pattern : NDArray of int
        30, 45, 60 or 90.

    Notes
    -----
    S_u = 1/(c (P/D - 1)), c = 1.73, 2, 1.16, 2 for 30, 45, 60, 90 degrees (Weaver, Fitzpatrick & ElKashlan
    1987, from memory), held so that S on the velocity between the tubes is never below 0.20. With unequal
    pitches the 30 and 90 degree forms are read as f = U_gap/(2 SL), the 45 and 60 degree forms on the
    smallest pitch (rule of this service, within 25 %). Data cover P/D 1.2-2.7.
    """
    layout = {
        "transverse_pitch_ratio": transverse_pitch_ratio,
        "longitudinal_pitch_ratio": longitudinal_pitch_ratio,
        "arrangement": arrangement,
    }
    p = smallest_pitch_ratio(transverse_pitch_ratio, longitudinal_pitch_ratio, arrangement)
    by_rows = (pattern == NORMAL_TRIANGLE) | (pattern == INLINE)
    row_pitch = np.where(pattern == NORMAL_TRIANGLE, 1.73 / np.sqrt(0.75), 2.0) * longitudinal_pitch_ratio
    tube_pitch = np.where(pattern == ROTATED_TRIANGLE, 1.16, 2.0) * p
    between = np.maximum(1.0 / np.where(by_rows, row_pitch, tube_pitch), SINGLE_CYLINDER_STROUHAL)
    return between * np.where(by_rows, gap_velocity_ratio(**layout), pitch_velocity_ratio(**layout))


def shedding_band(pattern: Patterns) -> Array:
    """Half width of the Strouhal band [-]: 0.25 for 30 and 45, 0.35 for 60 and 90 degrees (own rule)."""
    return np.where((pattern == NORMAL_TRIANGLE) | (pattern == ROTATED_SQUARE), 0.25, 0.35)


def zukauskas_katinas_strouhal(transverse_pitch_ratio: Array) -> Array:
    """Strouhal number of in-line banks on the gap velocity, S_g = 0.2 + exp(-1.2 a^1.8) [-] (from memory)."""
    return 0.2 + np.exp(-1.2 * transverse_pitch_ratio**1.8)


def shedding_frequency(*, strouhal: Array, velocity_m_s: Array, diameter_m: Array) -> Array:
    """Frequency f = S U/D [Hz], S and U on the same velocity; a last or single row has S = 0.2 in the gap."""
    return strouhal * velocity_m_s / diameter_m


def nearest_frequency_ratio(*, shedding_hz: Array, band: Array | float, frequency_hz: Array) -> Array:
    """Ratio f_s/f_i [-] closest to 1 that a shedding band f_s (1 -+ band) offers to a mode."""
    ratio = shedding_hz / np.maximum(frequency_hz, _LEAST_HZ)
    return np.asarray(np.clip(1.0, ratio * (1.0 - band), ratio * (1.0 + band)))


def locks_in(frequency_ratio: Array) -> Mask:
    """Whether f_s/f_i lies inside the 30 % band 0.7-1.3 (ASME III, Appendix N-1324, from memory)."""
    return np.asarray(LOCK_IN.grade(np.abs(frequency_ratio - 1.0)) != WITHIN)


def shedding_grade(*, frequency_ratio: Array, reduced_damping: Array, amplitude_share: Array) -> Codes:
    """Grade every mode: within outside the band; inside it near if Cn >= 64 or y <= 0.02 D, else beyond.

    Parameters
    ----------
    frequency_ratio, reduced_damping, amplitude_share : Array
        f_s/f_i, Cn and y_rms/D [-].
    """
    harmless = (reduced_damping >= QUIET_REDUCED_DAMPING) | (amplitude_share <= LOCK_IN_AMPLITUDE_SHARE)
    return np.where(locks_in(frequency_ratio), np.where(harmless, NEAR, BEYOND), WITHIN).astype(np.int8)


def reduced_damping(
    *, mass_kg_m: Array, damping_ratio: Array, density_kg_m3: Array, diameter_m: Array
) -> Array:
    """Reduced damping Cn = 4 pi m zeta/(rho D^2) [-]; from 64 no lock-in (N-1324, from memory)."""
    return 4.0 * np.pi * mass_kg_m * damping_ratio / (density_kg_m3 * diameter_m**2)


def lift_coefficient(pitch_ratio: Array) -> Array:
    """Root-mean-square lift coefficient CL [-]: 0.075 below P/D 1.6, rising evenly to 0.5 at 3.

    Notes
    -----
    0.075: Pettigrew, Taylor & Fisher 2021. The rise towards the single cylinder is from memory, its
    straight line a rule of this service.
    """
    return np.interp(pitch_ratio, (1.6, 3.0), (0.075, 0.5))


def lock_in_amplitude(
    *,
    lift_coefficient: Array,
    velocity_m_s: Array,
    density_kg_m3: Array,
    diameter_m: Array,
    frequency_hz: Array,
    mass_kg_m: Array,
    damping_ratio: Array,
    absolute_m: Array,
    modal_mass_m: Array,
) -> Array:
    """Largest resonant amplitude of a mode under lift correlated over its whole length, y_rms [m], (N, M).

    Parameters
    ----------
    lift_coefficient, density_kg_m3, diameter_m, mass_kg_m : Array, (N,)
        CL [-], rho [kg/m3], D [m], m0 [kg/m].
    velocity_m_s : Array, (N, S) or (N, S, 8)
        Pitch velocity along the tube [m/s].
    frequency_hz, damping_ratio, modal_mass_m : Array, (N, M)
        f [Hz], zeta [-], integral of (m/m0) phi^2 [m].
    absolute_m : Array, (N, M, S, 8)
        Integrals of the modulus of phi [m]: the force follows the motion in every half wave.

    Notes
    -----
    y = CL rho D/2 Int U^2 |phi| dx/(m0 Int (m/m0) phi^2 dx (2 pi f)^2 2 zeta). One pinned span in its first
    mode: CL U^2 rho D/(4 pi^3 f^2 m zeta).
    """
    force = _along(velocity_m_s**2, absolute_m) * _case(0.5 * lift_coefficient * density_kg_m3 * diameter_m)
    radian = 2.0 * np.pi * np.maximum(frequency_hz, _LEAST_HZ)
    return force / (_case(mass_kg_m) * modal_mass_m * radian**2 * 2.0 * damping_ratio)


def effective_velocity(
    *, velocity_m_s: Array, squared_m: Array, modal_mass_m: Array, density_ratio: Array | float = 1.0
) -> Array:
    """Uniform velocity that a mode sees as it sees the real profile, V_e [m/s], (N, M).

    Parameters
    ----------
    velocity_m_s : Array, (N, S) or (N, S, 8)
        Velocity along the tube [m/s]; 0 outside the stream.
    squared_m, modal_mass_m : Array, (N, M, S, 8) and (N, M)
        Integrals of phi^2 and of (m/m0) phi^2 [m].
    density_ratio : Array or float
        rho(x)/rho_0 [-], shaped as the velocity.

    Notes
    -----
    V_e^2 = Int (rho/rho_0) V^2 phi^2 dx/Int (m/m0) phi^2 dx (energy of the mode; Connors 1978, Blevins 1990).
    """
    return np.sqrt(_along(density_ratio * velocity_m_s**2, squared_m) / modal_mass_m)


def turbulence_spectrum(*, reduced_frequency: Array, upstream: Mask) -> Array:
    """Dimensionless random lift of single-phase crossflow, S0 [-].

    Parameters
    ----------
    reduced_frequency : Array
        f_R = f D/U_p [-]; held above 0.01, where the data begin.
    upstream : NDArray of bool
        First rows or a highly turbulent inlet.

    Notes
    -----
    Interior 4e-4 f_R^-0.5 up to 0.5, 5e-5 f_R^-3.5 above; upstream 25 times that (Taylor & Pettigrew 2000,
    from memory; the branches join at 0.5).
    """
    x = np.maximum(reduced_frequency, 0.01)
    interior = np.where(x <= 0.5, 4e-4 * x**-0.5, 5e-5 * np.maximum(x, 0.5) ** -3.5)
    return np.where(upstream, 25.0, 1.0) * interior


def taylor_pettigrew_2000(
    *,
    velocity_m_s: Array,
    density_kg_m3: Array,
    diameter_m: Array,
    frequency_hz: Array,
    mass_kg_m: Array,
    damping_ratio: Array,
    squared_m: Array,
    modal_mass_m: Array,
    upstream: Mask,
) -> Array:
    """Largest root-mean-square amplitude of every mode under turbulence, y_rms [m], (N, M).

    Parameters
    ----------
    velocity_m_s : Array, (N, S) or (N, S, 8)
        Pitch velocity along the tube [m/s].
    density_kg_m3, diameter_m, mass_kg_m, upstream : Array, (N,)
        rho [kg/m3], D [m], m0 [kg/m], first rows or not.
    frequency_hz, damping_ratio, modal_mass_m : Array, (N, M)
        f [Hz], zeta [-], integral of (m/m0) phi^2 [m].
    squared_m : Array, (N, M, S, 8)
        Integrals of phi^2 [m].

    Notes
    -----
    S_F = S0 (rho U^2 D/2)^2 (D/U)(1 m/L)(D/0.02 m) is an equivalent force correlated over one pinned span
    L, with y^2 = S_F/(4 pi^5 f^3 m^2 zeta) in its first mode. It stands for a correlation length far below
    L, so in other modes and on other spans it acts through Int S phi^2 dx; the factor 8/pi^2 makes both
    agree on the pinned span.
    """
    v = _profile(velocity_m_s)
    d, f = _case(diameter_m)[..., None, None], np.maximum(frequency_hz, _LEAST_HZ)
    reduced = f[..., None, None] * d / np.maximum(v, _LEAST_M_S)
    first = np.asarray(upstream)[..., None, None, None]
    # (rho U^2 D/2)^2 (D/U) written so that it vanishes with U.
    force = 0.25 * _case(density_kg_m3**2)[..., None, None] * v**3 * d**3 * (d / 0.02)
    spectrum = turbulence_spectrum(reduced_frequency=reduced, upstream=first) * force
    total = over_spans(np.sum(spectrum * squared_m, axis=-1)) * (8.0 / np.pi**2)
    inertia = _case(mass_kg_m) * modal_mass_m
    return np.sqrt(total / (64.0 * np.pi**3 * f**3 * inertia**2 * damping_ratio))


def random_force_coefficient(*, frequency_hz: Array, upstream: Mask) -> Array:
    """C_R [s^0.5]: upstream 0.025 to 40 Hz and 0.108 10^(-0.0159 f) above; interior 0.012 (from memory)."""
    first = np.where(frequency_hz <= 40.0, 0.025, 0.108 * 10.0 ** (-0.0159 * frequency_hz))
    return np.where(upstream, first, np.minimum(first, 0.012))


def pettigrew_gorman_1978(
    *,
    velocity_m_s: Array,
    density_kg_m3: Array,
    diameter_m: Array,
    frequency_hz: Array,
    mass_kg_m: Array,
    damping_ratio: Array,
    absolute_m: Array,
    modal_mass_m: Array,
    upstream: Mask,
) -> Array:
    """Largest root-mean-square amplitude by the older, harsher reading, y_rms [m], (N, M).

    Notes
    -----
    S_F = (C_R rho U^2 D/2)^2, correlated over the whole tube in the phase of the motion (Pettigrew & Gorman
    1978, from memory). Arguments as ``taylor_pettigrew_2000``, ``absolute_m`` the integrals of the modulus
    of phi.
    """
    f = np.maximum(frequency_hz, _LEAST_HZ)
    c_r = random_force_coefficient(frequency_hz=f, upstream=np.asarray(upstream)[..., None])
    force = c_r * _along(velocity_m_s**2, absolute_m) * _case(0.5 * density_kg_m3 * diameter_m)
    inertia = _case(mass_kg_m) * modal_mass_m
    return force / np.sqrt(64.0 * np.pi**3 * f**3 * inertia**2 * damping_ratio)


def buffeting_limit(diameter_m: Array) -> Array:
    """Amplitude that is accepted [m]: the smaller of 0.25 mm and D/100 (common practice, no source)."""
    return np.minimum(BUFFETING_LIMIT_M, BUFFETING_LIMIT_SHARE * diameter_m)


def work_rate(
    *, frequency_hz: Array, mass_kg_m: Array, modal_mass_m: Array, amplitude_m: Array, damping_ratio: Array
) -> Array:
    """Power a mode loses at its supports, W = 16 pi^3 f^3 m0 Int (m/m0) phi^2 dx y_rms^2 zeta [W], (N, M).

    Notes
    -----
    2 zeta omega times the modal mass times the mean square velocity, normal motion in one plane; 8 pi^3 f^3
    m L y^2 zeta on one pinned span. A measure of wear to compare designs by, not a life.
    """
    inertia = _case(mass_kg_m) * modal_mass_m
    return 16.0 * np.pi**3 * frequency_hz**3 * inertia * amplitude_m**2 * damping_ratio


def stream_profile(*, spans_m: Array, start_m: Array, end_m: Array, velocity_m_s: Array) -> Array:
    """Velocity in the cells of a tube that lies in the stream from start to end only [m/s], (N, S, 8).

    Parameters
    ----------
    spans_m : Array, (N, S)
        Spans [m], 0 behind the last.
    start_m, end_m, velocity_m_s : Array, (N,)
        Distance of the stream's bounds from the first support [m]; velocity in the stream [m/s].

    Notes
    -----
    A cell the bound cuts carries U sqrt(share), which keeps the integral of U^2.
    """
    first = np.zeros_like(spans_m)
    for i in range(1, spans_m.shape[-1]):
        first[:, i] = first[:, i - 1] + spans_m[:, i - 1]
    cell = spans_m[..., None] / 8.0
    low = first[..., None] + cell * np.arange(8)
    inside = np.minimum(low + cell, end_m[:, None, None]) - np.maximum(low, start_m[:, None, None])
    share = np.clip(inside, 0.0, cell) / np.where(cell > 0.0, cell, 1.0)
    return np.asarray(velocity_m_s[:, None, None] * np.sqrt(share))


def _case(values: Array) -> Array:
    """Values of the case (N,) beside values of its modes (N, M)."""
    return np.asarray(values)[..., None]


def _profile(values: Array) -> Array:
    """(N, S) or (N, S, 8) beside (N, M, S, 8)."""
    return values[:, None, :, None] if values.ndim == 2 else values[:, None]


def _along(values: Array, cells: Array) -> Array:
    """Sum of a profile times the integrals of a mode over its cells, (N, M)."""
    return over_spans(np.sum(_profile(values) * cells, axis=-1))


_CAUTION = "Thresholds of vibration have scatter; an old, worn or fouled support changes the answer."
_NEEDS = (
    "spans",
    "ends",
    "mass",
    "Young's modulus",
    "diameter",
    "damping or support data",
    "density",
    "velocity",
)

LAWS = (
    Law(
        slug="weaver-1987",
        check="tube-vortex-shedding",
        gives="Strouhal number on the approach velocity",
        function=shedding_strouhal,
        source="Weaver, Fitzpatrick & ElKashlan, J. Press. Vessel Technol. 109 (1987) 219; "
        "Weaver & Fitzpatrick, J. Fluids Struct. 2 (1988) 73",
        trust="memory",
        velocity="approach",
        limits=(Limit(quantity="pitch_ratio", at_least=1.2, at_most=2.7),),
        doubt="25 to 35 % by layout; several peaks can stand side by side, and charts by others differ "
        "by 30 %. In-line the constants agree with a second source to 15 %.",
    ),
    Law(
        slug="zukauskas-katinas-1980",
        check="tube-vortex-shedding",
        gives="Strouhal number on the gap velocity",
        function=zukauskas_katinas_strouhal,
        source="Zukauskas & Katinas 1980",
        trust="memory",
        governs=False,
        patterns=(INLINE,),
        velocity="gap",
    ),
    Law(
        slug="pettigrew-taylor-fisher-2021",
        check="tube-vortex-shedding",
        gives="resonant amplitude",
        unit="m",
        function=lock_in_amplitude,
        source="Pettigrew, Taylor & Fisher, Flow-Induced Vibration Handbook, 2021",
        trust="confirmed",
        velocity="pitch",
        doubt="Lift correlated over the whole tube overstates small amplitudes several-fold; the lift "
        "coefficient above P/D 1.6 is from memory.",
    ),
    Law(
        slug="taylor-pettigrew-2000",
        check="tube-turbulence",
        gives="root-mean-square amplitude",
        unit="m",
        function=taylor_pettigrew_2000,
        source="Taylor & Pettigrew, J. Press. Vessel Technol. 122 (2000)",
        trust="consistent",
        velocity="pitch",
        limits=(Limit(quantity="reduced_frequency", at_least=0.01),),
    ),
    Law(
        slug="pettigrew-gorman-1978",
        check="tube-turbulence",
        gives="root-mean-square amplitude",
        unit="m",
        function=pettigrew_gorman_1978,
        source="Pettigrew & Gorman 1978",
        trust="memory",
        governs=False,
        velocity="pitch",
    ),
)

LOCK_IN = Criterion(
    slug="shedding-separation",
    check="tube-vortex-shedding",
    quantity="distance of the shedding from the natural frequency, as a share of it",
    unit="",
    sense="at-least",
    near=LOCK_IN_SEPARATION,
    beyond=0.0,
    source="ASME BPVC III, Appendix N-1324",
    trust="memory",
    needs=("spans", "ends", "mass", "Young's modulus", "velocity"),
    caution=_CAUTION,
)
LOCK_IN_AMPLITUDE = Criterion(
    slug="shedding-amplitude",
    check="tube-vortex-shedding",
    quantity="resonant amplitude over diameter, where shedding meets a mode",
    unit="",
    sense="at-most",
    near=0.0,
    beyond=LOCK_IN_AMPLITUDE_SHARE,
    source="Pettigrew, Taylor & Fisher, Flow-Induced Vibration Handbook, 2021",
    trust="confirmed",
    needs=_NEEDS,
    caution=_CAUTION,
)
BUFFETING = Criterion(
    slug="buffeting-amplitude",
    check="tube-turbulence",
    quantity="amplitude over accepted amplitude",
    unit="",
    sense="at-most",
    near=0.5,
    beyond=1.0,
    source="the smaller of 0.25 mm and a hundredth of the diameter",
    trust="practice",
    needs=_NEEDS,
    caution=_CAUTION,
)
CRITERIA = (LOCK_IN, LOCK_IN_AMPLITUDE, BUFFETING)
