"""Fin efficiencies and tip temperatures of annular and plate fins, dry and wet.

The film coefficient is the true one on fin and prime surface alike; where fouling lies on the fins, pass
1/(1/h + R_f). Efficiencies refer to a fin surface that counts the tip edge, with the plain tip radius.
Everything is a function on float64 arrays that broadcast together; nothing warns at height 0 (efficiency
1), at endless conductivity (1) or at coefficient 0 (1).
"""

import numpy as np

from crossbank_service.methods._blend import elementwise
from crossbank_service.methods._fin_conduction import SHORT, fin_parameter, ring, straight
from crossbank_service.methods._layout import is_staggered
from crossbank_service.methods.fin_surfaces import diagonal_pitch
from crossbank_service.methods.record import Array


def _annular(m: Array, root: Array, height: Array) -> Array:
    """Efficiency of a ring with adiabatic tip."""
    length = m * height
    short = length < SHORT
    flux, _ = ring(m, root, height)
    full = 2.0 * root * flux / np.where(short, 1.0, length * (2.0 * root + height))
    return np.where(short, 1.0 - length**2 / 3.0, full)


@elementwise
def annular_efficiency(
    *,
    heat_transfer_coefficient_w_m2_k: Array,
    fin_conductivity_w_m_k: Array,
    diameter_m: Array,
    fin_height_m: Array,
    fin_thickness_m: Array,
) -> Array:
    """Efficiency of an annular fin of uniform thickness under a uniform coefficient.

    Parameters
    ----------
    heat_transfer_coefficient_w_m2_k : Array
        Film coefficient on the fin, outside fouling included [W/(m2 K)].
    fin_conductivity_w_m_k : Array
        Conductivity of the fin metal [W/(m K)].
    diameter_m : Array
        Root diameter 2 r_1 [m].
    fin_height_m, fin_thickness_m : Array
        Fin height r_2 - r_1 and thickness [m].

    Returns
    -------
    Array
        Mean over root temperature difference of the fin [-].

    Notes
    -----
    2 r1/(m (r2^2 - r1^2)) [K1(a) I1(b) - I1(a) K1(b)]/[I0(a) K1(b) + K0(a) I1(b)], m = sqrt(2 h/(k t)), a =
    m r1, b = m r2: Gardner (1945), adiabatic tip; Kraus, Aziz & Welty (2001).
    """
    m = fin_parameter(heat_transfer_coefficient_w_m2_k, fin_conductivity_w_m_k, fin_thickness_m)
    return _annular(m, 0.5 * diameter_m, fin_height_m)


@elementwise
def annular_tip_ratio(
    *,
    heat_transfer_coefficient_w_m2_k: Array,
    fin_conductivity_w_m_k: Array,
    diameter_m: Array,
    fin_height_m: Array,
    fin_thickness_m: Array,
) -> Array:
    """Temperature difference at the tip of an annular fin over that at its root.

    Parameters
    ----------
    heat_transfer_coefficient_w_m2_k : Array
        Film coefficient on the fin, outside fouling included [W/(m2 K)].
    fin_conductivity_w_m_k : Array
        Conductivity of the fin metal [W/(m K)].
    diameter_m : Array
        Root diameter [m].
    fin_height_m, fin_thickness_m : Array
        Fin height and thickness [m].

    Returns
    -------
    Array
        (T_tip - T_stream)/(T_root - T_stream) [-].

    Notes
    -----
    1/(b [I0(a) K1(b) + K0(a) I1(b)]), with the symbols of :func:`annular_efficiency`; the same solution.
    """
    m = fin_parameter(heat_transfer_coefficient_w_m2_k, fin_conductivity_w_m_k, fin_thickness_m)
    return ring(m, 0.5 * diameter_m, fin_height_m)[1]


@elementwise
def annular_efficiency_schmidt(
    *,
    heat_transfer_coefficient_w_m2_k: Array,
    fin_conductivity_w_m_k: Array,
    diameter_m: Array,
    fin_height_m: Array,
    fin_thickness_m: Array,
) -> Array:
    """Schmidt's approximation of the annular fin, for hand calculations and comparisons.

    Parameters
    ----------
    heat_transfer_coefficient_w_m2_k : Array
        Film coefficient on the fin, outside fouling included [W/(m2 K)].
    fin_conductivity_w_m_k : Array
        Conductivity of the fin metal [W/(m K)].
    diameter_m : Array
        Root diameter [m].
    fin_height_m, fin_thickness_m : Array
        Fin height and thickness [m].

    Returns
    -------
    Array
        tanh(m r1 phi)/(m r1 phi), phi = (r2/r1 - 1)(1 + 0.35 ln(r2/r1)) [-].

    Notes
    -----
    Th. E. Schmidt (1949). Below the exact form by up to 1.6 % for efficiencies above 0.5 and r2/r1 up to 3.
    """
    m = fin_parameter(heat_transfer_coefficient_w_m2_k, fin_conductivity_w_m_k, fin_thickness_m)
    growth = 2.0 * fin_height_m / diameter_m
    return straight(m * fin_height_m * (1.0 + 0.35 * np.log1p(growth)))


@elementwise
def plate_equivalent_radius(
    *, arrangement: Array, diameter_m: Array, transverse_pitch_m: Array, longitudinal_pitch_m: Array
) -> Array:
    """Tip radius of the annular fin that stands for a tube's cell of a continuous plate.

    Parameters
    ----------
    arrangement : Array or float
        1 for staggered (hexagonal cell), 0 for in-line (rectangular cell).
    diameter_m : Array
        Collar diameter; the radius is never below half of it [m].
    transverse_pitch_m, longitudinal_pitch_m : Array
        Tube pitches [m].

    Returns
    -------
    Array
        Radius [m].

    Notes
    -----
    Staggered: sqrt(P_t P_l/pi), equal area. In-line: 1.28 M sqrt(L/M - 0.2), M and L half the shorter and
    half the longer pitch (Th. E. Schmidt 1945). With the exact annular efficiency, against
    plane conduction: hexagons within 0.5 %; rectangles low, for efficiencies above 0.5 by 0.5 to 1.7 % when
    square and by 1.4 to 5 % at an aspect of 1.5.
    """
    hexagon = np.sqrt(transverse_pitch_m * longitudinal_pitch_m / np.pi)
    half_short = 0.5 * np.minimum(transverse_pitch_m, longitudinal_pitch_m)
    half_long = 0.5 * np.maximum(transverse_pitch_m, longitudinal_pitch_m)
    rectangle = 1.28 * half_short * np.sqrt(half_long / half_short - 0.2)
    radius = np.where(is_staggered(arrangement), hexagon, rectangle)
    return np.maximum(radius, 0.5 * diameter_m)


@elementwise
def plate_efficiency(
    *,
    heat_transfer_coefficient_w_m2_k: Array,
    fin_conductivity_w_m_k: Array,
    arrangement: Array,
    diameter_m: Array,
    fin_thickness_m: Array,
    transverse_pitch_m: Array,
    longitudinal_pitch_m: Array,
) -> Array:
    """Efficiency of a continuous plate fin: the exact annular fin of equivalent radius.

    Parameters
    ----------
    heat_transfer_coefficient_w_m2_k : Array
        Film coefficient on the fin, outside fouling included [W/(m2 K)].
    fin_conductivity_w_m_k : Array
        Conductivity of the plate [W/(m K)].
    arrangement : Array or float
        1 for staggered, 0 for in-line.
    diameter_m : Array
        Collar diameter [m].
    fin_thickness_m : Array
        Plate thickness [m].
    transverse_pitch_m, longitudinal_pitch_m : Array
        Tube pitches [m].

    Returns
    -------
    Array
        Mean over root temperature difference [-].

    Notes
    -----
    :func:`plate_equivalent_radius` in :func:`annular_efficiency`.
    """
    radius = plate_equivalent_radius(
        arrangement=arrangement,
        diameter_m=diameter_m,
        transverse_pitch_m=transverse_pitch_m,
        longitudinal_pitch_m=longitudinal_pitch_m,
    )
    m = fin_parameter(heat_transfer_coefficient_w_m2_k, fin_conductivity_w_m_k, fin_thickness_m)
    root = 0.5 * diameter_m
    return _annular(m, root, radius - root)


@elementwise
def plate_corner_ratio(
    *,
    heat_transfer_coefficient_w_m2_k: Array,
    fin_conductivity_w_m_k: Array,
    arrangement: Array,
    diameter_m: Array,
    fin_thickness_m: Array,
    transverse_pitch_m: Array,
    longitudinal_pitch_m: Array,
) -> Array:
    """Temperature difference at the farthest corner of a plate cell over that at the collar.

    Parameters
    ----------
    heat_transfer_coefficient_w_m2_k : Array
        Film coefficient on the fin, outside fouling included [W/(m2 K)].
    fin_conductivity_w_m_k : Array
        Conductivity of the plate [W/(m K)].
    arrangement : Array or float
        1 for staggered, 0 for in-line.
    diameter_m : Array
        Collar diameter [m].
    fin_thickness_m : Array
        Plate thickness [m].
    transverse_pitch_m, longitudinal_pitch_m : Array
        Tube pitches [m].

    Returns
    -------
    Array
        (T_corner - T_stream)/(T_root - T_stream) [-], an estimate.

    Notes
    -----
    The mean of two rings (own choice): one out to the equivalent radius, one out to the corner, which is half
    the diagonal of a rectangle and in a staggered bank the circumradius of the three nearest tubes,
    P_d^2/max(P_t, 2 P_l). Against plane conduction between 0.01 too high and 0.06 too low, nearly always low:
    the corner is then rated nearer to the stream than it is.
    """
    short = diagonal_pitch(transverse_pitch_m=transverse_pitch_m, longitudinal_pitch_m=longitudinal_pitch_m)
    corner = np.where(
        is_staggered(arrangement),
        short**2 / np.maximum(transverse_pitch_m, 2.0 * longitudinal_pitch_m),
        np.hypot(0.5 * transverse_pitch_m, 0.5 * longitudinal_pitch_m),
    )
    radius = plate_equivalent_radius(
        arrangement=arrangement,
        diameter_m=diameter_m,
        transverse_pitch_m=transverse_pitch_m,
        longitudinal_pitch_m=longitudinal_pitch_m,
    )
    m = fin_parameter(heat_transfer_coefficient_w_m2_k, fin_conductivity_w_m_k, fin_thickness_m)
    root = 0.5 * diameter_m
    near, far = (ring(m, root, np.maximum(tip - root, 0.0))[1] for tip in (radius, corner))
    return 0.5 * (near + far)


@elementwise
def wet_coefficient(
    *,
    heat_transfer_coefficient_w_m2_k: Array,
    saturation_enthalpy_slope_j_kg_k: Array,
    heat_capacity_j_kg_k: Array,
) -> Array:
    """Film coefficient that takes the place of the dry one in a wet fin's efficiency.

    Parameters
    ----------
    heat_transfer_coefficient_w_m2_k : Array
        Dry film coefficient on the fin [W/(m2 K)].
    saturation_enthalpy_slope_j_kg_k : Array
        dh_sat/dT of saturated moist air at the mean temperature of the water film, per kg of dry air [J/(kg
        K)].
    heat_capacity_j_kg_k : Array
        Heat capacity of the moist air, per kg of dry air [J/(kg K)].

    Returns
    -------
    Array
        h b/c_p, to be passed to an efficiency of this module [W/(m2 K)].

    Notes
    -----
    Threlkeld (1970): with the enthalpy potential (Lewis number 1) the wet fin obeys the dry fin's equation
    with m_wet = sqrt(2 h b/(c_p k t)). The slope never falls below the heat capacity, the dry fin's own.
    """
    ratio = np.maximum(saturation_enthalpy_slope_j_kg_k / heat_capacity_j_kg_k, 1.0)
    return heat_transfer_coefficient_w_m2_k * ratio


@elementwise
def surface_efficiency(*, fin_efficiency: Array, fin_area_share: Array) -> Array:
    """Efficiency of the whole outside surface, fins and prime.

    Parameters
    ----------
    fin_efficiency : Array
        Efficiency of the fins [-].
    fin_area_share : Array
        Fin surface over the whole outside surface [-].

    Returns
    -------
    Array
        1 - A_fin/A (1 - eta) [-].

    Notes
    -----
    (A_prime + eta A_fin)/A.
    """
    return 1.0 - fin_area_share * (1.0 - fin_efficiency)
