"""How far a low-density mixture is from the ideal gas it is taken for."""

from types import MappingProxyType

import numpy as np

from crossbank_service.properties._gas_data import SPECIES
from crossbank_service.properties.medium import Array

NOTABLE_DEVIATION = 0.02
"""A mixture whose density departs from the ideal gas's by more is rated with a caution,"""
HIGHEST_DEVIATION = 0.1
"""and by more than this it is refused."""

_CRITICAL: MappingProxyType[str, tuple[float, float, float]] = MappingProxyType(
    {
        "nitrogen": (126.19, 3.396e6, 0.0372),
        "oxygen": (154.58, 5.043e6, 0.0222),
        "carbon_dioxide": (304.13, 7.377e6, 0.2239),
        "water": (647.10, 22.064e6, 0.3443),
        "argon": (150.69, 4.863e6, -0.0022),
        "sulfur_dioxide": (430.64, 7.884e6, 0.2557),
        "carbon_monoxide": (132.86, 3.494e6, 0.0497),
        "hydrogen": (33.15, 1.296e6, -0.219),
        "helium": (5.195, 0.2276e6, -0.3836),
        "methane": (190.56, 4.599e6, 0.0114),
        "ethane": (305.32, 4.872e6, 0.0995),
        "propane": (369.89, 4.251e6, 0.1521),
        "n_butane": (425.13, 3.796e6, 0.2008),
        "ammonia": (405.56, 11.363e6, 0.2558),
    }
)
"""Critical temperature [K], critical pressure [Pa] and acentric factor, as in CoolProp."""


def compressibility(mole_fractions: Array, temperature_k: Array, pressure_pa: Array) -> Array:
    """Estimate of the compressibility factor p v/(R T) of a gas mixture.

    Parameters
    ----------
    mole_fractions : Array
        Shape (N, number of gases), in the order of ``gas_mixture.GASES``.
    temperature_k, pressure_pa : Array
        [K], [Pa], shape (N,).

    Returns
    -------
    Array
        [-], shape (N,); held between 0 and 2.

    Notes
    -----
    Z = 1 + (B0 + omega B1) p_r/T_r, B0 = 0.083 - 0.422/T_r^1.6, B1 = 0.139 - 0.172/T_r^4.2 (Pitzer's correlation in the
    form of Abbott; Smith, Van Ness and Abbott, Introduction to Chemical Engineering Thermodynamics, equations
    (3.61) to (3.66), from memory), with mole-fraction means of the critical constants (Kay's rule). It tells how far
    off the ideal gas is; it is no equation of state for the density.
    """
    critical_t, critical_p, acentric = (np.zeros_like(temperature_k) for _ in range(3))
    for i, name in enumerate(SPECIES):
        t, p, omega = _CRITICAL[name]
        y = mole_fractions[:, i]
        if not y.any():  # it would add exact zeros
            continue
        critical_t, critical_p, acentric = critical_t + y * t, critical_p + y * p, acentric + y * omega
    reduced = np.maximum(temperature_k / critical_t, 0.1)
    b0 = 0.083 - 0.422 * reduced**-1.6
    b1 = 0.139 - 0.172 * reduced**-4.2
    z = 1.0 + (b0 + acentric * b1) * pressure_pa / critical_p / reduced
    return np.clip(z, 0.0, 2.0)
