"""A medium in the narrow range of temperatures that one rating can meet: polynomials instead of reference models.

Between the two inlet temperatures of a bank every property is so smooth that a polynomial through a few exact values
carries it to better than a part in a million; evaluating it costs a fraction of the model behind it.
"""

from dataclasses import dataclass
from typing import Self

import numpy as np
from numpy.typing import NDArray

from crossbank_service.properties._arrays import spread
from crossbank_service.properties.medium import Array, Medium, State

DEGREE = 9
LEAST_HALF_RANGE_K = 1.0

_NODES = np.cos(np.pi * (np.arange(DEGREE + 1) + 0.5) / (DEGREE + 1))
_TO_POWERS = np.linalg.inv(np.vander(_NODES, DEGREE + 1, increasing=True))


def _powers(values: Array) -> Array:
    """Coefficients (N, DEGREE + 1) by powers of x from values (N, DEGREE + 1) at the nodes."""
    out = np.zeros_like(values)
    for k in range(DEGREE + 1):  # in a fixed order, so that a case rounds alike in any array
        out += values[:, k : k + 1] * _TO_POWERS[:, k]
    return out


@dataclass(frozen=True, slots=True)
class LocalMedium:
    """Another medium, tabulated case by case between two temperatures at one pressure.

    Attributes
    ----------
    middle, half : Array
        Middle and half width of the range [K], shape (N,).
    pressure : Array
        Pressure of the tabulation [Pa]; a gas's density goes on in proportion to it, a liquid's does not change.
    density, heat_capacity, conductivity, viscosity, enthalpy_rise : Array
        Coefficients (N, K) by powers of x = (T - middle)/half; density times temperature for a gas, the logarithm of
        the viscosity for a liquid; the enthalpy is the integral of the heat capacity.
    gas : bool

    Notes
    -----
    Relative error against the medium behind it below 1e-6 over ranges up to 600 K for gases and 200 K for
    liquids. Outside the range the end values are held and the enthalpy goes on linearly.
    """

    middle: Array
    half: Array
    pressure: Array
    density: Array
    heat_capacity: Array
    conductivity: Array
    viscosity: Array
    enthalpy_rise: Array
    gas: bool

    @classmethod
    def of(cls, medium: Medium, low: Array, high: Array, pressure: Array) -> Self:
        """Tabulate ``medium`` between ``low`` and ``high`` [K] at ``pressure`` [Pa], arrays (N,)."""
        middle = 0.5 * (low + high)
        half = np.maximum(0.5 * (high - low), LEAST_HALF_RANGE_K)
        nodes = middle[:, None] + half[:, None] * _NODES
        exact = medium.at(nodes, pressure[:, None])
        density = exact.density_kg_m3 * nodes if medium.gas else exact.density_kg_m3
        viscosity = exact.viscosity_pa_s if medium.gas else np.log(exact.viscosity_pa_s)
        cp = _powers(exact.heat_capacity_j_kg_k)
        # integral of cp over T in powers of x, zero at the middle
        rise = np.concatenate([np.zeros((len(low), 1)), cp / np.arange(1.0, DEGREE + 2.0)], axis=1)
        return cls(
            middle=middle,
            half=half,
            pressure=pressure,
            density=_powers(density),
            heat_capacity=cp,
            conductivity=_powers(exact.conductivity_w_m_k),
            viscosity=_powers(viscosity),
            enthalpy_rise=rise * half[:, None],
            gas=medium.gas,
        )

    def _x(self, t: Array) -> Array:
        return np.asarray(np.clip((t - spread(self.middle, t)) / spread(self.half, t), -1.0, 1.0))

    def _four(self, x: Array) -> Array:
        """The four properties at once, along the first axis."""
        n, k = self.density.shape
        stacked = np.stack((self.density, self.heat_capacity, self.conductivity, self.viscosity))
        columns = np.ascontiguousarray(np.moveaxis(stacked, -1, 0)).reshape((k, 4, n) + (1,) * (x.ndim - 1))
        value = columns[-1] * x
        value += columns[-2]
        for c in range(k - 3, -1, -1):
            value *= x
            value += columns[c]
        return np.asarray(value)

    def at(self, temperature_k: Array, pressure_pa: Array) -> State:
        """Properties at temperatures of shape (N, ...); ``pressure_pa`` broadcasts."""
        x = self._x(temperature_k)
        density, heat_capacity, conductivity, viscosity = self._four(x)
        if self.gas:
            density = density / temperature_k * (pressure_pa / spread(self.pressure, x))
        else:
            viscosity = np.exp(viscosity)
        return State(
            density_kg_m3=density,
            heat_capacity_j_kg_k=heat_capacity,
            conductivity_w_m_k=conductivity,
            viscosity_pa_s=viscosity,
        )

    def enthalpy(self, temperature_k: Array, pressure_pa: Array) -> Array:  # noqa: ARG002
        """Specific enthalpy above the middle of the range [J/kg], the exact integral of the heat capacity."""
        x = self._x(temperature_k)
        beyond = temperature_k - spread(self.middle, x) - x * spread(self.half, x)
        held = _horner(self.heat_capacity, np.sign(beyond)) * beyond if beyond.any() else 0.0
        return _horner(self.enthalpy_rise, x) + held

    def take(self, index: NDArray[np.intp]) -> Self:
        """The same for a selection of the cases."""
        return type(self)(
            self.middle[index],
            self.half[index],
            self.pressure[index],
            self.density[index],
            self.heat_capacity[index],
            self.conductivity[index],
            self.viscosity[index],
            self.enthalpy_rise[index],
            self.gas,
        )


def _horner(coefficients: Array, x: Array) -> Array:
    shape = (-1,) + (1,) * (x.ndim - 1)
    columns = coefficients.T.reshape((coefficients.shape[1], *shape))
    value = columns[-1] * x
    value += columns[-2]
    for k in range(len(columns) - 3, -1, -1):
        value *= x
        value += columns[k]
    return np.asarray(value)
