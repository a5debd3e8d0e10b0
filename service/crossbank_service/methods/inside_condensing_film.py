"""Condensate film running down a vertical tube, without vapour shear."""

import numpy as np

from crossbank_service.methods._condensing import GRAVITY
from crossbank_service.methods._numeric import Value
from crossbank_service.methods.record import Array

_WAVY_START = 30.0
_TURBULENT_START = 1800.0
_LEAST_REYNOLDS = 1e-6


def falling_film_mean(
    *,
    film_reynolds: Value,
    liquid_density_kg_m3: Value,
    liquid_viscosity_pa_s: Value,
    liquid_conductivity_w_m_k: Value,
    liquid_heat_capacity_j_kg_k: Value,
) -> Array:
    """Mean coefficient of a condensate film from the top down to where it is evaluated.

    Parameters
    ----------
    film_reynolds : array
        Four times the condensate flow per wetted perimeter over its viscosity [-]; below 1e-6 read as 1e-6.
    liquid_density_kg_m3 : array
        At saturation [kg/m3].
    liquid_viscosity_pa_s : array
        At saturation [Pa s].
    liquid_conductivity_w_m_k : array
        At saturation [W/(m K)].
    liquid_heat_capacity_j_kg_k : array
        At saturation [J/(kg K)].

    Returns
    -------
    array
        Heat transfer coefficient [W/(m2 K)].

    Notes
    -----
    h (nu^2/g)^(1/3)/k = 1.467 Re^(-1/3) to Re 30 (Nusselt 1916); Re/(1.08 Re^1.22 - 5.2) to 1800
    (Kutateladze 1963); Re/[8750 + 58 Pr^-0.5 (Re^0.75 - 253)] above (Labuntsov 1957). The heat of
    condensation that goes with it is h_fg + 0.68 c_l dT (Rohsenow 1956).
    """
    re = np.maximum(np.asarray(film_reynolds, dtype=np.float64), _LEAST_REYNOLDS)
    viscosity = np.asarray(liquid_viscosity_pa_s, dtype=np.float64)
    prandtl = liquid_heat_capacity_j_kg_k * viscosity / liquid_conductivity_w_m_k
    laminar = (4.0 / 3.0) ** (4.0 / 3.0) * re ** (-1.0 / 3.0)
    wavy_re = np.maximum(re, _WAVY_START)
    wavy = wavy_re / (1.08 * wavy_re**1.22 - 5.2)
    fast_re = np.maximum(re, _TURBULENT_START)
    turbulent = fast_re / (8750.0 + 58.0 / np.sqrt(prandtl) * (fast_re**0.75 - 253.0))
    star = np.where(re <= _WAVY_START, laminar, np.where(re <= _TURBULENT_START, wavy, turbulent))
    h: Array = star * liquid_conductivity_w_m_k / _film_length(viscosity, liquid_density_kg_m3)
    return h


def falling_film_local(
    *,
    film_reynolds: Value,
    liquid_density_kg_m3: Value,
    liquid_viscosity_pa_s: Value,
    liquid_conductivity_w_m_k: Value,
    liquid_heat_capacity_j_kg_k: Value,
) -> Array:
    """Local coefficient of a condensate film, the form for stepping down a tube.

    Parameters
    ----------
    film_reynolds, liquid_density_kg_m3, liquid_viscosity_pa_s, liquid_conductivity_w_m_k : array
        As in ``falling_film_mean``.
    liquid_heat_capacity_j_kg_k : array
        At saturation [J/(kg K)].

    Returns
    -------
    array
        Heat transfer coefficient [W/(m2 K)].

    Notes
    -----
    Largest of laminar 1.10 Re^(-1/3) (Nusselt 1916), wavy 0.756 Re^-0.22 and turbulent
    0.023 Re^0.25 Pr^0.5 (Butterworth 1981), each times k (nu^2/g)^(-1/3).
    """
    re = np.maximum(np.asarray(film_reynolds, dtype=np.float64), _LEAST_REYNOLDS)
    viscosity = np.asarray(liquid_viscosity_pa_s, dtype=np.float64)
    prandtl = liquid_heat_capacity_j_kg_k * viscosity / liquid_conductivity_w_m_k
    star = np.maximum(
        (4.0 / 3.0) ** (1.0 / 3.0) * re ** (-1.0 / 3.0),
        np.maximum(0.756 * re**-0.22, 0.023 * re**0.25 * np.sqrt(prandtl)),
    )
    h: Array = star * liquid_conductivity_w_m_k / _film_length(viscosity, liquid_density_kg_m3)
    return h


def _film_length(viscosity: Array, density: Value) -> Array:
    """(nu^2/g)^(1/3), the film's own length."""
    length: Array = np.cbrt((viscosity / density) ** 2 / GRAVITY)
    return length
