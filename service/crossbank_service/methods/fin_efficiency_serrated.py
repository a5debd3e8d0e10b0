"""Fin efficiencies of serrated fins, and Weierman's own for solid and serrated fins.

The film coefficient is the true one on fin and prime surface alike; where fouling lies on the fins, pass
1/(1/h + R_f). Nothing warns at height 0 (efficiency 1), at endless conductivity (1) or at coefficient 0 (1).
"""

import numpy as np

from crossbank_service.methods._blend import elementwise
from crossbank_service.methods._fin_conduction import LEAST_THICKNESS, SHORT, fin_parameter, ring, straight
from crossbank_service.methods.record import Array


@elementwise
def segment_efficiency(
    *,
    heat_transfer_coefficient_w_m2_k: Array,
    fin_conductivity_w_m_k: Array,
    fin_thickness_m: Array,
    segment_width_m: Array,
    cut_depth_m: Array,
) -> Array:
    """Efficiency of one segment of a serrated fin, from the root of the cuts.

    Parameters
    ----------
    heat_transfer_coefficient_w_m2_k : Array
        Film coefficient on the fin, outside fouling included [W/(m2 K)].
    fin_conductivity_w_m_k : Array
        Conductivity of the fin metal [W/(m K)].
    fin_thickness_m, segment_width_m : Array
        Section of the strip [m].
    cut_depth_m : Array
        Length of the strip [m].

    Returns
    -------
    Array
        X = tanh(m L)/(m L) [-].

    Notes
    -----
    m = sqrt(2 h (t + w_s)/(k t w_s)), L = cut depth + t/2 (Weierman 1976).
    """
    x = _segment_parameter(
        heat_transfer_coefficient_w_m2_k, fin_conductivity_w_m_k, fin_thickness_m, segment_width_m
    ) * (cut_depth_m + 0.5 * fin_thickness_m)
    return straight(np.where(cut_depth_m > 0.0, x, 0.0))


def _segment_parameter(film: Array, conductivity: Array, thickness: Array, width: Array) -> Array:
    """Fin parameter m of a strip wetted all round [1/m]."""
    section = np.maximum(thickness, LEAST_THICKNESS) * width
    return np.sqrt(2.0 * film * (thickness + width) / (conductivity * section))


def _serrated(
    *,
    film: Array,
    conductivity: Array,
    diameter: Array,
    height: Array,
    thickness: Array,
    width: Array,
    cut_depth: Array,
) -> tuple[Array, Array]:
    """Efficiency and tip ratio of strips standing on an uncut ring, exact in one dimension each."""
    m = fin_parameter(film, conductivity, thickness)
    m_strip = _segment_parameter(film, conductivity, thickness, width)
    length = np.where(cut_depth > 0.0, cut_depth + 0.5 * thickness, 0.0)
    strip = straight(m_strip * length)
    root = 0.5 * diameter
    ring_height = np.maximum(height - cut_depth, 0.0)
    root_of_cuts = root + ring_height
    # all heat lost by the strips leaves through the edge of the ring, which their feet cover
    strip_area = 2.0 * np.pi * root_of_cuts * (2.0 * length * (thickness + width) / width)
    ring_area = 2.0 * np.pi * ring_height * (diameter + ring_height)
    m_safe = np.where(m > 0.0, m, 1.0)
    edge = np.where(m > 0.0, m_strip**2 * length * strip / m_safe, 0.0)
    flux, edge_ratio = ring(m, root, ring_height, edge)
    ideal = m * (ring_area + strip_area) / (2.0 * 2.0 * np.pi * root)
    # heat through the root over h A theta_1; 2 h/(k t) = m^2 takes the place of the film
    still = (m * ring_height < SHORT) & (m_strip * length < SHORT)
    efficiency = np.where(still, 1.0, flux / np.where(still, 1.0, ideal))
    ratio = edge_ratio / np.cosh(np.minimum(m_strip * length, 300.0))
    return efficiency, ratio


@elementwise
def serrated_efficiency(
    *,
    heat_transfer_coefficient_w_m2_k: Array,
    fin_conductivity_w_m_k: Array,
    diameter_m: Array,
    fin_height_m: Array,
    fin_thickness_m: Array,
    segment_width_m: Array,
    cut_depth_m: Array,
) -> Array:
    """Efficiency of a serrated fin under a uniform coefficient: strips on an uncut ring.

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
    segment_width_m, cut_depth_m : Array
        Width of a segment and depth of the cuts from the tip [m].

    Returns
    -------
    Array
        Mean over root temperature difference of ring and segments together [-].

    Notes
    -----
    Cut to the root it is tanh(m L)/(m L) of :func:`segment_efficiency`. With an uncut ring the ring's Bessel
    solution carries the strips as a conductance on its edge (own derivation, exact for one-dimensional
    conduction in either part); a strip counts t/2 longer for its tip.
    """
    return _serrated(
        film=heat_transfer_coefficient_w_m2_k,
        conductivity=fin_conductivity_w_m_k,
        diameter=diameter_m,
        height=fin_height_m,
        thickness=fin_thickness_m,
        width=segment_width_m,
        cut_depth=cut_depth_m,
    )[0]


@elementwise
def serrated_tip_ratio(
    *,
    heat_transfer_coefficient_w_m2_k: Array,
    fin_conductivity_w_m_k: Array,
    diameter_m: Array,
    fin_height_m: Array,
    fin_thickness_m: Array,
    segment_width_m: Array,
    cut_depth_m: Array,
) -> Array:
    """Temperature difference at the tip of the segments over that at the root.

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
    segment_width_m, cut_depth_m : Array
        Width of a segment and depth of the cuts from the tip [m].

    Returns
    -------
    Array
        (T_tip - T_stream)/(T_root - T_stream) [-].

    Notes
    -----
    The solution of :func:`serrated_efficiency` at the end of the strip.
    """
    return _serrated(
        film=heat_transfer_coefficient_w_m2_k,
        conductivity=fin_conductivity_w_m_k,
        diameter=diameter_m,
        height=fin_height_m,
        thickness=fin_thickness_m,
        width=segment_width_m,
        cut_depth=cut_depth_m,
    )[1]


@elementwise
def weierman_solid_efficiency(
    *,
    heat_transfer_coefficient_w_m2_k: Array,
    fin_conductivity_w_m_k: Array,
    diameter_m: Array,
    fin_height_m: Array,
    fin_thickness_m: Array,
) -> Array:
    """Efficiency of solid fins as Weierman reduced his data: only with ``weierman-1976``.

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
        Efficiency under the uneven coefficient of a real fin [-].

    Notes
    -----
    X = tanh(m L)/(m L), m = sqrt(2 h/(k t)), L = h + t/2; Y = X (0.7 + 0.3 X);
    efficiency Y [0.45 ln(d_f/d) (Y - 1) + 1] (Weierman 1976). Never below 0.
    """
    m = fin_parameter(heat_transfer_coefficient_w_m2_k, fin_conductivity_w_m_k, fin_thickness_m)
    x = straight(np.where(fin_height_m > 0.0, m * (fin_height_m + 0.5 * fin_thickness_m), 0.0))
    y = x * (0.7 + 0.3 * x)
    return y * np.maximum(0.45 * np.log1p(2.0 * fin_height_m / diameter_m) * (y - 1.0) + 1.0, 0.0)


@elementwise
def weierman_serrated_efficiency(
    *,
    heat_transfer_coefficient_w_m2_k: Array,
    fin_conductivity_w_m_k: Array,
    diameter_m: Array,
    fin_height_m: Array,
    fin_thickness_m: Array,
    segment_width_m: Array,
    cut_depth_m: Array,
) -> Array:
    """Efficiency of serrated fins as Weierman reduced his data: only with ``weierman-1976``.

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
    segment_width_m, cut_depth_m : Array
        Width of a segment and depth of the cuts from the tip [m].

    Returns
    -------
    Array
        X (0.9 + 0.1 X) [-].

    Notes
    -----
    Weierman (1976), X of :func:`segment_efficiency`. Where an uncut ring is left, X is that of ring and
    strips together (:func:`serrated_efficiency`), which is the same for fins cut to the root; own choice,
    the source has fins cut to the root in mind.
    """
    x, _ = _serrated(
        film=heat_transfer_coefficient_w_m2_k,
        conductivity=fin_conductivity_w_m_k,
        diameter=diameter_m,
        height=fin_height_m,
        thickness=fin_thickness_m,
        width=segment_width_m,
        cut_depth=cut_depth_m,
    )
    return x * (0.9 + 0.1 * x)
