"""Conduction in one fin: the strip and the ring of uniform thickness, the pieces all fins are made of."""

import numpy as np
from scipy.special import ive, kve

from crossbank_service.methods.record import Array

# Below this m L an efficiency differs from its parabola by less than 1e-19 and the Bessel forms lose digits.
SHORT = 1e-5
# A fin thinner than an atom conducts nothing worth a division by zero.
LEAST_THICKNESS = 1e-10
# Beyond this m r the fin is straight over the length it conducts, and the Bessel forms give out.
STRAIGHT = 1e6


def fin_parameter(film: Array, conductivity: Array, thickness: Array) -> Array:
    """Fin parameter m = sqrt(2 h / (k t)) [1/m] of a fin wetted on both faces."""
    return np.sqrt(2.0 * film / (conductivity * np.maximum(thickness, LEAST_THICKNESS)))


def straight(x: Array) -> Array:
    """tanh(x)/x with its limit 1 at 0."""
    small = x < SHORT
    safe = np.where(small, 1.0, x)
    return np.where(small, 1.0 - x**2 / 3.0, np.tanh(safe) / safe)


def ring(m: Array, root: Array, height: Array, edge: Array | float = 0.0) -> tuple[Array, Array]:
    """Root flux and tip temperature of a ring of uniform thickness.

    ``edge`` is the conductance of what hangs on the tip, in units of k m. Returns -theta'(r1)/(m theta_1)
    and theta(r2)/theta_1. The modified Bessel functions are scaled, so that nothing but
    exp(-2 m (r2 - r1)) remains of their growth.
    """
    length = m * height
    plain = (length < SHORT) | (m * (root + height) > STRAIGHT)
    a = np.where(plain, 1.0, m * root)
    b = np.where(plain, 2.0, m * (root + height))
    across = np.where(plain, 1.0, length)
    decay = np.exp(-2.0 * across)
    rising_flux = ive(1, b) + edge * ive(0, b)
    falling_flux = (kve(1, b) - edge * kve(0, b)) * decay
    below = ive(0, a) * falling_flux + kve(0, a) * rising_flux
    flux = (kve(1, a) * rising_flux - ive(1, a) * falling_flux) / below
    theta = np.exp(-across) / (b * below)
    # a ring that is very short or very large is straight: the same problem with hyperbolic functions
    t = np.tanh(length)
    straight_flux = (t + edge) / (1.0 + edge * t)
    straight_theta = 1.0 / (np.cosh(np.minimum(length, 300.0)) * (1.0 + edge * t))
    return np.where(plain, straight_flux, flux), np.where(plain, straight_theta, theta)
