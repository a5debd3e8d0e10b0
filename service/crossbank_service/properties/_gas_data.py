"""Low-density gases: heat capacity and transport as short fits, one record a gas.

Heat capacity::

    cp0/R = c0 + sum v E(theta/T),   E(u) = u^2 e^u / (e^u - 1)^2

Transport, L = ln(T/500 K), as polynomials of L, continued by a power law outside the fitted range::

    ln(mu / 1e-6 Pa s) = sum a_i L^i,   ln(k / 1e-3 W/(m K)) = sum b_i L^i

The fits are to the zero-density values of CoolProp 8.0; its heat capacities agree with the NIST-JANAF
tables within 0.05 %. Steam transport is the IAPWS 2008 (viscosity) and 2011 (conductivity) zero-density form.
Sulfur dioxide and carbon monoxide, for which there is no reference transport equation there, come from the
Chapman-Enskog theory.
"""

from collections.abc import Callable
from dataclasses import dataclass
from types import MappingProxyType

import numpy as np

from crossbank_service.properties.medium import Array

R = 8.314462618
"""Molar gas constant [J/(mol K)]."""

Transport = Callable[[Array], tuple[Array, Array]]


@dataclass(frozen=True, slots=True)
class HeatCapacity:
    """Ideal-gas heat capacity with Einstein functions, and its exact integral."""

    constant: float
    terms: tuple[tuple[float, float], ...] = ()

    def over_r(self, temperature_k: Array) -> Array:
        """cp0/R [-]."""
        total = np.full_like(temperature_k, self.constant)
        for v, theta in self.terms:
            half = 0.5 * theta / temperature_k
            ratio = half / np.sinh(half)
            total += v * ratio * ratio
        return total

    def integral_over_r(self, temperature_k: Array) -> Array:
        """Integral of cp0/R over temperature, up to a constant [K]."""
        total = self.constant * temperature_k
        for v, theta in self.terms:
            total += v * theta / np.expm1(theta / temperature_k)
        return total


@dataclass(frozen=True, slots=True)
class LogPolynomials:
    """Viscosity and conductivity as polynomials in ln(T/500 K); power laws outside ``low``..``high``."""

    viscosity: tuple[float, ...]
    conductivity: tuple[float, ...]
    low_k: float
    high_k: float

    def __call__(self, temperature_k: Array) -> tuple[Array, Array]:
        """Viscosity [Pa s] and conductivity [W/(m K)]."""
        full = np.log(temperature_k / 500.0)
        held = np.clip(full, np.log(self.low_k / 500.0), np.log(self.high_k / 500.0))
        beyond = full - held
        mu = np.exp(_polynomial(self.viscosity, held, beyond))
        k = np.exp(_polynomial(self.conductivity, held, beyond))
        return 1e-6 * mu, 1e-3 * k


def _polynomial(coefficients: tuple[float, ...], x: Array, beyond: Array) -> Array:
    """Polynomial at ``x`` plus its slope there times ``beyond``."""
    value = np.zeros_like(x)
    slope = np.zeros_like(x)
    for c in reversed(coefficients):
        slope = slope * x + value
        value = value * x + c
    return value + slope * beyond


@dataclass(frozen=True, slots=True)
class Steam:
    """Zero-density steam, IAPWS R12-08 equation (11) and IAPWS R15-11 equation (16)."""

    def __call__(self, temperature_k: Array) -> tuple[Array, Array]:
        """Viscosity [Pa s] and conductivity [W/(m K)]."""
        t = np.maximum(temperature_k, 150.0) / 647.096
        i = 1.0 / t
        root = np.sqrt(t)
        mu = 1e-4 * root / (1.67752 + i * (2.20462 + i * (0.6366564 - i * 0.241605)))
        k = 2.443221e-3 + i * (1.323095e-2 + i * (6.770357e-3 + i * (-3.454586e-3 + i * 4.096266e-4)))
        return mu, 1e-3 * root / k


@dataclass(frozen=True, slots=True)
class ChapmanEnskog:
    """Viscosity from the Lennard-Jones collision integral (Neufeld 1972), conductivity after Eucken.

    k = mu/M (f_cv cv + f_r R); f = (1, 9/4) is Eucken's own form.
    """

    molar_mass_kg_mol: float
    sigma_angstrom: float
    epsilon_over_k: float
    heat_capacity: HeatCapacity
    factor_cv: float = 1.0
    factor_r: float = 2.25

    def __call__(self, temperature_k: Array) -> tuple[Array, Array]:
        """Viscosity [Pa s] and conductivity [W/(m K)]."""
        t = temperature_k / self.epsilon_over_k
        collision = 1.16145 * np.exp(-0.14874 * np.log(t))
        collision += 0.52487 * np.exp(-0.7732 * t) + 2.16178 * np.exp(-2.43787 * t)
        mu = 2.6693e-6 * np.sqrt(1e3 * self.molar_mass_kg_mol * temperature_k)
        mu = mu / (self.sigma_angstrom**2 * collision)
        cv_over_r = self.heat_capacity.over_r(temperature_k) - 1.0
        k = mu * R / self.molar_mass_kg_mol * (self.factor_cv * cv_over_r + self.factor_r)
        return mu, k


@dataclass(frozen=True, slots=True)
class Species:
    """One gas at low density.

    ``low_k`` and ``high_k`` bound the fitted range; ``error`` and ``doubt`` say how good the values are.
    """

    slug: str
    molar_mass_kg_mol: float
    heat_capacity: HeatCapacity
    transport: Transport
    low_k: float
    high_k: float
    error: str
    doubt: str | None = None


def _fitted(
    slug: str,
    molar_mass: float,
    cp: HeatCapacity,
    *,
    mu: tuple[float, ...],
    k: tuple[float, ...],
    span: tuple[float, float],
    error: str,
    doubt: str | None = None,
) -> Species:
    low, high = span
    return Species(slug, molar_mass, cp, LogPolynomials(mu, k, low, high), low, high, error, doubt)


_N2 = HeatCapacity(3.50127, ((1.01557, 3349.35), (0.0389568, 6846.29)))
_O2 = HeatCapacity(3.50218, ((1.03526, 2253.62), (0.585199, 9861.01)))
_CO2 = HeatCapacity(3.53253, ((2.20532, 1014.84), (1.26167, 2404.54), (0.616263, 4095.88)))
_H2O = HeatCapacity(4.01136, ((0.953209, 2256.54), (1.06207, 4799.15), (1.22532, 5957.67)))
_SO2 = HeatCapacity(4.04431, ((1.15832, 835.511), (1.89493, 1912.85), (0.15547, 7126.19)))
_CO = HeatCapacity(3.50093, ((1.01362, 3075.52), (0.0329416, 6137.15)))
# Leachman et al., J. Phys. Chem. Ref. Data 38 (2009) 721, table 5, normal hydrogen
_H2 = HeatCapacity(
    2.5, ((1.616, 531.0), (-0.4117, 751.0), (-0.792, 1989.0), (0.758, 2484.0), (1.217, 6859.0))
)
_DRY_AIR_PARTS = ((0.78084, _N2), (0.20946, _O2), (0.00934, HeatCapacity(2.5)), (0.00036, _CO2))
_DRY_AIR = HeatCapacity(
    sum(y * cp.constant for y, cp in _DRY_AIR_PARTS),
    tuple((y * v, theta) for y, cp in _DRY_AIR_PARTS for v, theta in cp.terms),
)

DRY_AIR = _fitted(
    "air",
    0.02896546,
    _DRY_AIR,
    mu=(3.29881, 0.70925, -0.0599353, 0.0155368, 0.00330983, 2.05231e-7),
    k=(3.68705, 0.784232, -0.0476356, 0.019335, 0.00210635, -0.000297954),
    span=(150.0, 1800.0),
    error="cp 0.02 %, viscosity and conductivity 0.03 % of the reference equations",
)
WATER = Species(
    "water", 0.018015268, _H2O, Steam(), 200.0, 1800.0, "cp 0.005 % above 273 K, transport is the reference"
)

_SPECIES = (
    _fitted(
        "nitrogen",
        0.0280134,
        _N2,
        mu=(3.26026, 0.704169, -0.057887, 0.016105, 0.00331248, -7.27921e-7),
        k=(3.66418, 0.768667, -0.0510651, 0.020527, 0.00251371, -0.000289787),
        span=(150.0, 1800.0),
        error="cp 0.013 %, viscosity and conductivity 0.03 %",
    ),
    _fitted(
        "oxygen",
        0.0319988,
        _O2,
        mu=(3.41675, 0.726549, -0.0659592, 0.0137194, 0.00330945, 3.55499e-7),
        k=(3.71403, 0.829542, -0.0511, 0.0161501, 0.00147491, -0.000297109),
        span=(150.0, 1800.0),
        error="cp 0.021 %, viscosity and conductivity 0.03 %",
    ),
    _fitted(
        "carbon_dioxide",
        0.0440095,
        _CO2,
        mu=(3.17431, 0.860186, -0.116196, -0.00616884, 0.0280928, -0.0077717),
        k=(3.49158, 1.24241, -0.184185, -0.037053, 0.0372287, -0.0084434),
        span=(220.0, 1800.0),
        error="cp 0.019 %, viscosity and conductivity 0.04 %",
    ),
    WATER,
    _fitted(
        "argon",
        0.039948,
        HeatCapacity(2.5),
        mu=(3.52837, 0.752915, -0.0730401, 0.0112104, 0.00331162, -3.82805e-7),
        k=(3.28486, 0.752213, -0.0760169, 0.011605, 0.0033476, 4.0045e-5),
        span=(150.0, 1800.0),
        error="cp exact, viscosity and conductivity 0.03 %",
    ),
    Species(
        "sulfur_dioxide",
        0.0640638,
        _SO2,
        ChapmanEnskog(0.0640638, 4.112, 335.4, _SO2),
        200.0,
        1800.0,
        "cp 0.011 %, viscosity 3 %, conductivity 8 %",
        "Transport is estimated (Chapman-Enskog, Eucken); meant for traces.",
    ),
    Species(
        "carbon_monoxide",
        0.0280101,
        _CO,
        ChapmanEnskog(0.0280101, 3.69, 91.7, _CO, 1.16, 2.01),
        200.0,
        1800.0,
        "cp 0.02 %, viscosity 2 %, conductivity 4 %",
        "Transport is estimated: Chapman-Enskog, and the mean of Eucken's and the modified Eucken form.",
    ),
    _fitted(
        "hydrogen",
        0.00201588,
        _H2,
        mu=(2.54463, 0.696573, 0.00777791, 0.00251244, -0.00276981),
        k=(5.60189, 0.713847, 0.0169374, 0.0942769, -0.0110783, -0.0111601),
        span=(200.0, 1000.0),
        error="cp 0.01 %, viscosity and conductivity 0.02 % as a pure gas",
        doubt="In mixtures with heavy gases the mixing rules may miss the conductivity by 10 %.",
    ),
    _fitted(
        "helium",
        0.004002602,
        HeatCapacity(2.5),
        mu=(3.34501, 0.696833, 0.0101156, -0.00252612, 0.000155902, 8.29062e-05),
        k=(5.4037, 0.696131, 0.00353138, -0.00111141, 0.000244658, -3.18793e-05),
        span=(200.0, 1800.0),
        error="cp exact, viscosity and conductivity 0.001 % as a pure gas",
        doubt="In mixtures with heavy gases the mixing rules may miss the conductivity by 10 %.",
    ),
    _fitted(
        "methane",
        0.0160428,
        HeatCapacity(4.00481, ((4.58831, 1944.76), (2.24995, 3543.65), (2.84871, 4935.88))),
        mu=(2.83128, 0.770625, -0.060807, 0.0134333, -0.00353809, 0.00119342),
        k=(4.22589, 1.43451, 0.052955, -0.243297, 0.00764006, 0.114366),
        span=(200.0, 1000.0),
        error="cp 0.003 %, viscosity 0.001 %, conductivity 0.1 %",
    ),
    _fitted(
        "ethane",
        0.03006904,
        HeatCapacity(4.48877, ((2.77851, 952.874), (8.02449, 1899.75), (6.13573, 4190.35))),
        mu=(2.69187, 0.832331, -0.106429, 0.00646243, 0.0145794, -0.00560961),
        k=(3.98364, 1.76111, -0.249224, -0.200535, 0.118632, 0.0707014),
        span=(200.0, 1000.0),
        error="cp 0.01 %, viscosity 0.002 %, conductivity 0.2 %",
    ),
    _fitted(
        "propane",
        0.04409562,
        HeatCapacity(5.44216, ((4.57296, 857.391), (11.8251, 1822.57), (8.17615, 4236.26))),
        mu=(2.5857, 0.898163, -0.116644, -0.0608364),
        k=(3.83356, 1.81529, 0.0484475, 0.00565814, -0.00959647, 0.00445212),
        span=(200.0, 1000.0),
        error="cp 0.02 %, viscosity and conductivity 0.003 %",
    ),
    _fitted(
        "n_butane",
        0.0581222,
        HeatCapacity(7.48646, ((4.71797, 783.234), (15.7485, 1727.35), (10.3132, 4070.85))),
        mu=(2.50353, 0.943668, -0.0390391),
        k=(3.75809, 1.89739, 0.0840777, -0.046861, 0.0174287, -0.00263045),
        span=(200.0, 1000.0),
        error="cp 0.02 %, viscosity and conductivity 0.003 %",
    ),
    _fitted(
        "ammonia",
        0.01703052,
        HeatCapacity(4.0, ((2.224, 1646.0), (3.148, 3965.0), (0.9579, 7231.0))),
        mu=(2.88269, 1.08172, -0.0990488, -0.0698261, 0.11161),
        k=(3.97169, 1.55463, -0.549379, -1.5804, -0.293747, 0.178557),
        span=(200.0, 650.0),
        error="cp exact to its equation, viscosity 0.001 %, conductivity 0.11 %",
    ),
)

SPECIES: MappingProxyType[str, Species] = MappingProxyType({s.slug: s for s in _SPECIES})
"""The gases a mixture may hold, in the order of a composition array's columns."""


def gas_records() -> tuple[Species, ...]:
    """All gases a mixture may hold."""
    return _SPECIES
