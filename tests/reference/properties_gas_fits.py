"""Generator of the low-density gas fits in ``crossbank_service/properties/_gas_data.py``.

Run by hand, never by the tests: ``python tests/reference/properties_gas_fits.py`` prints the coefficients
and the largest deviation from the values fitted. The heat capacity is fitted with Einstein functions and the
transport properties with a fifth-degree polynomial in ln(T/500), to CoolProp's zero-density values.
"""

import sys

import CoolProp
import numpy as np
from CoolProp.CoolProp import AbstractState
from numpy.typing import NDArray
from scipy.optimize import least_squares

Array = NDArray[np.float64]

GASES = {
    "hydrogen": ("Hydrogen", 200.0, 1000.0, 3),
    "helium": ("Helium", 200.0, 1800.0, 0),
    "methane": ("Methane", 200.0, 1000.0, 3),
    "ethane": ("Ethane", 200.0, 1000.0, 3),
    "propane": ("n-Propane", 200.0, 1000.0, 3),
    "n_butane": ("n-Butane", 200.0, 1000.0, 3),
    "ammonia": ("Ammonia", 200.0, 1000.0, 3),
    "carbon_monoxide": ("CarbonMonoxide", 200.0, 1800.0, 2),
}


def einstein(u: Array) -> Array:
    """Einstein function u^2 e^u / (e^u - 1)^2."""
    return (u / 2 / np.sinh(np.minimum(u / 2, 300.0))) ** 2


def fit_heat_capacity(T: Array, cp_over_r: Array, terms: int) -> tuple[Array, float]:
    """Fit c0 + sum v E(theta/T) by the relative error; positive amplitudes and temperatures only."""

    def model(p: Array) -> Array:
        value = np.full_like(T, p[0])
        for i in range(terms):
            value += np.exp(p[1 + 2 * i]) * einstein(np.exp(p[2 + 2 * i]) / T)
        return np.asarray(value)

    def residual(p: Array) -> Array:
        return np.asarray(model(p) / cp_over_r - 1)

    best: tuple[Array, float] | None = None
    rng = np.random.default_rng(1)
    for _ in range(40):
        guess = [3.5 if terms else 2.5]
        for theta in np.sort(rng.uniform(300.0, 7000.0, terms)):
            guess += [np.log(2.0), np.log(theta)]
        found = least_squares(residual, np.array(guess), xtol=1e-14, ftol=1e-14)
        worst = float(np.max(np.abs(model(found.x) / cp_over_r - 1)))
        if best is None or worst < best[1]:
            best = (found.x, worst)
    assert best is not None
    return best


def main() -> None:
    """Print the coefficients of every gas."""
    for slug, (name, low, high, terms) in GASES.items():
        state = AbstractState("HEOS", name)
        T = np.geomspace(low, high, 80)
        cp, mu, k = [], [], []
        for t in T:
            state.update(CoolProp.DmolarT_INPUTS, 1e-3, t)
            cp.append(state.cp0molar() / 8.314462618)
            try:
                mu.append(state.viscosity())
                k.append(state.conductivity())
            except ValueError:
                pass
        p, worst = fit_heat_capacity(T, np.array(cp), terms)
        pairs = [(float(np.exp(p[1 + 2 * i])), float(np.exp(p[2 + 2 * i]))) for i in range(terms)]
        pairs.sort(key=lambda pair: pair[1])
        out = [f"{slug}: M {state.molar_mass() * 1e3:.7g} range {low:g}-{high:g}", f"  cp {p[0]:.6g} "]
        out[-1] += " ".join(f"({v:.6g}, {t:.6g})" for v, t in pairs) + f"  max error {worst:.1e}"
        for label, values, unit in (("mu", mu, 1e-6), ("k", k, 1e-3)):
            if len(values) < len(T):
                continue
            y = np.log(np.array(values) / unit)
            c = np.polynomial.polynomial.polyfit(np.log(T / 500), y, 5)
            error = np.max(np.abs(np.exp(np.polynomial.polynomial.polyval(np.log(T / 500), c) - y) - 1))
            out.append(f"  {label} {', '.join(f'{v:.6g}' for v in c)}  max error {error:.1e}")
        sys.stdout.write("\n".join(out) + "\n")


if __name__ == "__main__":
    main()
