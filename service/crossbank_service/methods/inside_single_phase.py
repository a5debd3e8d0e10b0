"""Flow in tubes without change of phase: heat transfer, and the front door of friction and local losses.

Laminar, transition and turbulent flow are joined without a jump and every function is finite down to
Reynolds number 0.
"""

import numpy as np

from crossbank_service.methods import inside_friction
from crossbank_service.methods._numeric import Value
from crossbank_service.methods.inside_friction import (
    ENTRY_LOSS,
    EXIT_LOSS,
    LAMINAR_END,
    TURBULENT_START,
    churchill_1977,
    colebrook_1939,
    friction_gradient,
    friction_wall_factor,
    fully_rough_friction_factor,
    haaland_1983,
    return_bend_loss,
)
from crossbank_service.methods.record import Array, Limit, Method

__all__ = [
    "ENTRY_LOSS",
    "EXIT_LOSS",
    "RECORDS",
    "churchill_1977",
    "colebrook_1939",
    "friction_gradient",
    "friction_wall_factor",
    "fully_rough_friction_factor",
    "gnielinski_1976",
    "gnielinski_1976_constant_flux",
    "haaland_1983",
    "hausen_laminar_nusselt",
    "laminar_nusselt",
    "laminar_nusselt_constant_flux",
    "return_bend_loss",
    "smooth_friction_factor",
    "turbulent_nusselt",
    "wall_property_factor",
]


def smooth_friction_factor(*, reynolds: Value) -> Array:
    """Darcy friction factor of smooth tubes in turbulent flow.

    Parameters
    ----------
    reynolds : array
        Reynolds number on the bore [-]; values below 4000 are read as 4000.

    Returns
    -------
    array
        Darcy friction factor [-].

    Notes
    -----
    f = (1.8 log10 Re - 1.5)^-2, the explicit smooth-tube law of Konakov (1946) that goes with the
    Gnielinski equation. Within 1 % of (1.82 log10 Re - 1.64)^-2.
    """
    re = np.maximum(reynolds, TURBULENT_START)
    f: Array = (1.8 * np.log10(re) - 1.5) ** -2.0
    return f


def laminar_nusselt(*, reynolds: Value, prandtl: Value, diameter_length_ratio: Value) -> Array:
    """Mean Nusselt number of laminar flow from the tube's entry, constant wall temperature.

    Parameters
    ----------
    reynolds, prandtl : array
        On the bore, bulk properties [-].
    diameter_length_ratio : array
        Bore over heated length between mixings [-].

    Returns
    -------
    array
        Nusselt number on the bore [-]; 3.66 in the limit of no flow.

    Notes
    -----
    Nu^3 = 3.66^3 + 0.7^3 + (1.615 z^(1/3) - 0.7)^3 + ((2/(1 + 22 Pr))^(1/6) z^(1/2))^3, z = Re Pr D/L
    (Gnielinski, VDI Heat Atlas, section G1, thermal and hydrodynamic entry; form from memory).
    """
    pr = np.asarray(prandtl, dtype=np.float64)
    z = reynolds * pr * diameter_length_ratio
    entry = (2.0 / (1.0 + 22.0 * pr)) ** (1.0 / 6.0) * np.sqrt(z)
    nu: Array = np.cbrt(3.66**3 + 0.7**3 + (1.615 * np.cbrt(z) - 0.7) ** 3 + entry**3)
    return nu


def laminar_nusselt_constant_flux(*, reynolds: Value, prandtl: Value, diameter_length_ratio: Value) -> Array:
    """Mean Nusselt number of laminar flow from the tube's entry, constant heat flux.

    Parameters
    ----------
    reynolds, prandtl : array
        On the bore, bulk properties [-].
    diameter_length_ratio : array
        Bore over heated length between mixings [-].

    Returns
    -------
    array
        Nusselt number on the bore [-]; 4.364 in the limit of no flow.

    Notes
    -----
    Nu^3 = 4.364^3 + 0.6^3 + (1.953 z^(1/3) - 0.6)^3 + (0.924 Pr^(1/3) (Re D/L)^(1/2))^3, z = Re Pr D/L
    (Gnielinski, VDI Heat Atlas, section G1; form from memory).
    """
    pr = np.asarray(prandtl, dtype=np.float64)
    z = reynolds * pr * diameter_length_ratio
    entry = 0.924 * np.cbrt(pr) * np.sqrt(np.asarray(reynolds) * diameter_length_ratio)
    nu: Array = np.cbrt(4.364**3 + 0.6**3 + (1.953 * np.cbrt(z) - 0.6) ** 3 + entry**3)
    return nu


def hausen_laminar_nusselt(*, reynolds: Value, prandtl: Value, diameter_length_ratio: Value) -> Array:
    """Mean Nusselt number of laminar flow, constant wall temperature, fully developed velocity.

    Parameters
    ----------
    reynolds, prandtl : array
        On the bore, bulk properties [-].
    diameter_length_ratio : array
        Bore over heated length [-].

    Returns
    -------
    array
        Nusselt number on the bore [-].

    Notes
    -----
    Nu = 3.66 + 0.0668 z/(1 + 0.04 z^(2/3)), z = Re Pr D/L (Hausen 1943). A second opinion.
    """
    z = np.asarray(reynolds) * prandtl * diameter_length_ratio
    nu: Array = 3.66 + 0.0668 * z / (1.0 + 0.04 * np.cbrt(z) ** 2)
    return nu


def turbulent_nusselt(*, reynolds: Value, prandtl: Value, diameter_length_ratio: Value) -> Array:
    """Mean Nusselt number of turbulent flow, constant properties.

    Parameters
    ----------
    reynolds : array
        On the bore [-]; values below 4000 are read as 4000.
    prandtl : array
        Bulk [-].
    diameter_length_ratio : array
        Bore over heated length between mixings [-].

    Returns
    -------
    array
        Nusselt number on the bore [-].

    Notes
    -----
    Nu = (f/8)(Re - 1000) Pr/[1 + 12.7 (f/8)^(1/2) (Pr^(2/3) - 1)] [1 + (D/L)^(2/3)], smooth f
    (Gnielinski, Int. Chem. Eng. 16 (1976) 359-368). Re 4e3 to 1e6, Pr 0.5 to 2000, scatter 10 %.
    """
    re = np.maximum(reynolds, TURBULENT_START)
    pr = np.asarray(prandtl, dtype=np.float64)
    eighth = smooth_friction_factor(reynolds=re) / 8.0
    core = eighth * (re - 1000.0) * pr / (1.0 + 12.7 * np.sqrt(eighth) * (np.cbrt(pr) ** 2 - 1.0))
    nu: Array = core * (1.0 + np.cbrt(np.asarray(diameter_length_ratio)) ** 2)
    return nu


def wall_property_factor(
    *, prandtl: Value, prandtl_wall: Value | None = None, temperature_ratio: Value = 1.0
) -> tuple[Array, Array]:
    """Factors on the Nusselt number for properties that change towards the wall.

    Parameters
    ----------
    prandtl : array
        Bulk [-].
    prandtl_wall : array, optional
        At the surface the fluid touches [-]; ``prandtl`` when left out.
    temperature_ratio : array
        Bulk over surface temperature, kelvin [-].

    Returns
    -------
    tuple of array
        The factor of liquids and the factor of gases [-].

    Notes
    -----
    Liquids (Pr/Pr_w)^0.11 for 0.05 < Pr/Pr_w < 20; gases heated (T/T_w)^0.45 for 0.5 < T/T_w < 1, gases
    cooled 1 (Gnielinski 1976). Outside these spans the factor keeps its value at the end.
    """
    wall = prandtl if prandtl_wall is None else prandtl_wall
    liquid: Array = np.clip(np.asarray(prandtl, dtype=np.float64) / wall, 0.05, 20.0) ** 0.11
    vapour: Array = np.clip(np.asarray(temperature_ratio, dtype=np.float64), 0.5, 1.0) ** 0.45
    return liquid, vapour


def _joined(laminar: Array, turbulent: Array, reynolds: Value) -> Array:
    """Linear in Re from the laminar value at 2300 to the turbulent one at 4000 (Gnielinski 2013)."""
    share = np.clip((np.asarray(reynolds) - LAMINAR_END) / (TURBULENT_START - LAMINAR_END), 0.0, 1.0)
    nu: Array = (1.0 - share) * laminar + share * turbulent
    return nu


def gnielinski_1976(
    *,
    reynolds: Value,
    prandtl: Value,
    diameter_length_ratio: Value,
    prandtl_wall: Value | None = None,
    temperature_ratio: Value = 1.0,
    gas: Value = 0.0,
) -> Array:
    """Mean Nusselt number in tubes, constant wall temperature, any Reynolds number.

    Parameters
    ----------
    reynolds, prandtl : array
        On the bore, bulk properties [-].
    diameter_length_ratio : array
        Bore over heated length between mixings [-].
    prandtl_wall : array, optional
        Liquids: Prandtl number at the wall [-]; left out means no wall factor.
    temperature_ratio : array
        Gases: bulk over wall temperature [-].
    gas : array
        True for gases.

    Returns
    -------
    array
        Nusselt number on the bore [-].

    Notes
    -----
    Laminar up to Re 2300 (``laminar_nusselt``), turbulent from 4000 (``turbulent_nusselt``), between them
    linear in Re with both ends at the same Pr and D/L (Gnielinski, Int. J. Heat Mass Transfer 63 (2013)
    134-140). The wall factor of liquids acts on all of it, that of gases on the turbulent part only.
    """
    liquid, vapour = wall_property_factor(
        prandtl=prandtl, prandtl_wall=prandtl_wall, temperature_ratio=temperature_ratio
    )
    is_gas = np.asarray(gas, dtype=bool)
    laminar = laminar_nusselt(
        reynolds=np.minimum(reynolds, LAMINAR_END),
        prandtl=prandtl,
        diameter_length_ratio=diameter_length_ratio,
    )
    turbulent = turbulent_nusselt(
        reynolds=reynolds, prandtl=prandtl, diameter_length_ratio=diameter_length_ratio
    )
    return _joined(
        laminar * np.where(is_gas, 1.0, liquid), turbulent * np.where(is_gas, vapour, liquid), reynolds
    )


def gnielinski_1976_constant_flux(
    *,
    reynolds: Value,
    prandtl: Value,
    diameter_length_ratio: Value,
    prandtl_wall: Value | None = None,
    temperature_ratio: Value = 1.0,
    gas: Value = 0.0,
) -> Array:
    """Mean Nusselt number in tubes, constant heat flux, any Reynolds number.

    Parameters
    ----------
    reynolds, prandtl, diameter_length_ratio, prandtl_wall, temperature_ratio, gas : array
        As in ``gnielinski_1976``.

    Returns
    -------
    array
        Nusselt number on the bore [-].

    Notes
    -----
    As ``gnielinski_1976`` with ``laminar_nusselt_constant_flux`` for the laminar part; in turbulent flow
    the two boundary conditions share one equation.
    """
    liquid, vapour = wall_property_factor(
        prandtl=prandtl, prandtl_wall=prandtl_wall, temperature_ratio=temperature_ratio
    )
    is_gas = np.asarray(gas, dtype=bool)
    laminar = laminar_nusselt_constant_flux(
        reynolds=np.minimum(reynolds, LAMINAR_END),
        prandtl=prandtl,
        diameter_length_ratio=diameter_length_ratio,
    )
    turbulent = turbulent_nusselt(
        reynolds=reynolds, prandtl=prandtl, diameter_length_ratio=diameter_length_ratio
    )
    return _joined(
        laminar * np.where(is_gas, 1.0, liquid), turbulent * np.where(is_gas, vapour, liquid), reynolds
    )


RECORDS = (
    Method(
        slug="gnielinski-1976",
        role="inside_heat_transfer",
        surfaces=("single-phase",),
        gives="nusselt",
        function=gnielinski_1976,
        inputs=("reynolds", "prandtl", "diameter_length_ratio"),
        options=("prandtl_wall", "temperature_ratio", "gas"),
        limits=(
            Limit(quantity="reynolds", at_most=1e6),
            Limit(quantity="prandtl", at_least=0.5, at_most=2000.0),
            Limit(quantity="diameter_length_ratio", at_most=1.0),
        ),
        source=(
            "V. Gnielinski, Int. Chem. Eng. 16 (1976) 359-368; transition V. Gnielinski, Int. J. Heat Mass "
            "Transfer 63 (2013) 134-140; laminar: VDI Heat Atlas, section G1, constant wall temperature"
        ),
        doubt=(
            "laminar form and its constants from memory; slow liquids in horizontal tubes can take twice the "
            "laminar value by natural convection; scatter 20 % in transition (Re 2300-4000)"
        ),
        note="smooth friction factor whatever the roughness; linear in Re from 2300 to 4000",
        scatter_fraction=0.10,
        standard_uncertainty_fraction=0.06,
    ),
    *inside_friction.RECORDS,
)
