"""Condensation of a vapour beside a gas that does not condense."""

from collections.abc import Callable

import numpy as np

from crossbank_service.methods._numeric import Value, bracketed_root
from crossbank_service.methods.record import Array

_ATMOSPHERE_PA = 101325.0
_LEAST_GAS_FRACTION = 1e-12


def steam_air_diffusivity(*, temperature_k: Value, pressure_pa: Value) -> Array:
    """Binary diffusion coefficient of water vapour in air.

    Parameters
    ----------
    temperature_k : array
        [K]; read within 280 to 1070.
    pressure_pa : array
        [Pa].

    Returns
    -------
    array
        Diffusivity [m2/s].

    Notes
    -----
    p D = 1.87e-10 T^2.072 atm m2/s (282 to 450 K) and 2.75e-9 T^1.632 (450 to 1070 K), T in kelvin (Marrero
    and Mason, J. Phys. Chem. Ref. Data 1 (1972) 3-118; the hot branch from memory, it meets the other).
    """
    t = np.clip(np.asarray(temperature_k, dtype=np.float64), 280.0, 1070.0)
    product = np.where(t < 450.0, 1.87e-10 * t**2.072, 2.75e-9 * t**1.632)
    d: Array = product * _ATMOSPHERE_PA / np.asarray(pressure_pa, dtype=np.float64)
    return d


def colburn_hougen(
    *,
    film_coefficient_w_m2_k: Value,
    gas_coefficient_w_m2_k: Value,
    wall_temperature_k: Value,
    bulk_temperature_k: Value,
    pressure_pa: Value,
    vapour_pressure_pa: Value,
    saturation_pressure: Callable[[Array], Array],
    latent_heat_j_kg: Value,
    gas_heat_capacity_j_kg_k: Value,
    vapour_molar_mass_kg_mol: Value,
    mixture_molar_mass_kg_mol: Value,
    lewis: Value,
) -> tuple[Array, Array]:
    """Heat flux through film and gas layer, from the balance at their interface.

    Parameters
    ----------
    film_coefficient_w_m2_k : array
        Of the condensate film [W/(m2 K)].
    gas_coefficient_w_m2_k : array
        Of the gas and vapour core, sensible heat [W/(m2 K)].
    wall_temperature_k, bulk_temperature_k : array
        Of the wall and of the core [K]; wall below core.
    pressure_pa, vapour_pressure_pa : array
        Total pressure and partial pressure of the vapour in the core [Pa].
    saturation_pressure : callable
        Saturation pressure [Pa] of temperatures [K], on arrays of the common shape.
    latent_heat_j_kg : array
        [J/kg].
    gas_heat_capacity_j_kg_k : array
        Of the core [J/(kg K)].
    vapour_molar_mass_kg_mol, mixture_molar_mass_kg_mol : array
        [kg/mol].
    lewis : array
        Thermal diffusivity over diffusion coefficient of the core [-]; about 0.5 for steam with a little air,
        0.85 to 0.91 for air with a little steam.

    Returns
    -------
    tuple of array
        Heat flux into the film [W/m2] and interface temperature [K].

    Notes
    -----
    h_film (T_i - T_w) = h_g (T_b - T_i) + M_v h_fg h_g/(c_p M) Le^(-2/3) ln[(P - p_i)/(P - p_b)],
    p_i = p_sat(T_i) (Colburn and Hougen, Ind. Eng. Chem. 26 (1934) 1178-1182). The interface lies between
    wall and core; its temperature is found by bracketing there. A gas share below 1e-12 is read as that.
    """
    pressure = np.asarray(pressure_pa, dtype=np.float64)
    gas_bulk = np.maximum(pressure - vapour_pressure_pa, _LEAST_GAS_FRACTION * pressure)
    mass = (
        np.asarray(vapour_molar_mass_kg_mol)
        / mixture_molar_mass_kg_mol
        * latent_heat_j_kg
        * gas_coefficient_w_m2_k
        / gas_heat_capacity_j_kg_k
        * np.asarray(lewis, dtype=np.float64) ** (-2.0 / 3.0)
    )

    def excess(interface: Array) -> Array:
        gas_interface = np.maximum(pressure - saturation_pressure(interface), _LEAST_GAS_FRACTION * pressure)
        into_film = film_coefficient_w_m2_k * (interface - wall_temperature_k)
        from_core = gas_coefficient_w_m2_k * (bulk_temperature_k - interface)
        balance: Array = into_film - from_core - mass * np.log(gas_interface / gas_bulk)
        return balance

    wall, core, *_ = np.broadcast_arrays(
        np.asarray(wall_temperature_k, dtype=np.float64),
        np.asarray(bulk_temperature_k, dtype=np.float64),
        mass,
        gas_bulk,
        np.asarray(film_coefficient_w_m2_k, dtype=np.float64),
    )
    interface = bracketed_root(excess, wall, core)
    flux: Array = film_coefficient_w_m2_k * (interface - wall_temperature_k)
    return flux, interface


def silver_bell_ghaly(
    *, film_coefficient_w_m2_k: Value, gas_coefficient_w_m2_k: Value, sensible_share: Value
) -> Array:
    """Effective condensing coefficient with the gas layer in series.

    Parameters
    ----------
    film_coefficient_w_m2_k : array
        Of the condensate film [W/(m2 K)].
    gas_coefficient_w_m2_k : array
        Of the gas and vapour core flowing alone [W/(m2 K)].
    sensible_share : array
        Z, sensible part of the enthalpy change along the dew curve: x c_pg dT_dew/dh [-].

    Returns
    -------
    array
        Heat transfer coefficient between wall and dew temperature [W/(m2 K)].

    Notes
    -----
    1/h = 1/h_film + Z/h_g (Silver 1947; Bell and Ghaly, AIChE Symp. Ser. 69 (131) (1973) 72-79). Within 10
    to 15 % of ``colburn_hougen``.
    """
    film = np.asarray(film_coefficient_w_m2_k, dtype=np.float64)
    h: Array = 1.0 / (1.0 / film + np.asarray(sensible_share) / gas_coefficient_w_m2_k)
    return h
