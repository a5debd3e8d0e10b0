"""Banks of tubes with annular fins, from the area ratio: Ganguli 1985 and Schmidt 1963.

For staggered and in-line banks. Nusselt and Reynolds numbers are on the root diameter, the velocity is that
of the narrowest section, the fluid is taken at the bulk mean. Both go with the exact annular fin
efficiency.
"""

import numpy as np

from crossbank_service.methods._blend import elementwise, log_reynolds
from crossbank_service.methods._finned import FIN_INPUTS, fin_area_ratio
from crossbank_service.methods._layout import is_staggered
from crossbank_service.methods.record import Array, DerivedLimit, Limit, Method


@elementwise
def ganguli_1985(
    *,
    reynolds: Array,
    prandtl: Array,
    arrangement: Array,
    rows: Array,
    diameter_m: Array,
    fin_height_m: Array,
    fin_thickness_m: Array,
    fin_pitch_m: Array,
) -> Array:
    """Mean Nusselt number of a bank with annular fins after Ganguli, Tung & Taborek 1985.

    Parameters
    ----------
    reynolds, prandtl : Array
        Re in the narrowest section on the root diameter, Pr of the bulk [-].
    arrangement : Array
        1 for staggered, 0 for in-line.
    rows : Array
        Rows along the stream [-].
    diameter_m : Array
        Root diameter [m].
    fin_height_m, fin_thickness_m, fin_pitch_m : Array
        Fin height, thickness and pitch [m].

    Returns
    -------
    Array
        Nu on the root diameter [-].

    Notes
    -----
    Nu = C Re^0.6 (A/A_bare)^-0.15 Pr^(1/3). Staggered C = 0.20, 0.33, 0.36, 0.38 for 1, 2, 3, 4 rows and
    more; in-line 0.20 below 4 rows, 0.22 from there (A. Ganguli, S. S. Tung & J. Taborek, AIChE Symp. Ser.
    81 (1985) 122-128, with the row constants of the VDI Heat Atlas, 2010, part M1). A/A_bare 5 to 30, Re
    1e3 to 1e5.
    """
    constant = np.where(
        is_staggered(arrangement),
        np.interp(rows, [1.0, 2.0, 3.0, 4.0], [0.20, 0.33, 0.36, 0.38]),
        np.interp(rows, [3.0, 4.0], [0.20, 0.22]),
    )
    ratio = fin_area_ratio(
        diameter_m=diameter_m,
        fin_height_m=fin_height_m,
        fin_thickness_m=fin_thickness_m,
        fin_pitch_m=fin_pitch_m,
    )
    return constant * np.exp(0.6 * log_reynolds(reynolds)) * ratio**-0.15 * np.cbrt(prandtl)


@elementwise
def schmidt_1963(
    *,
    reynolds: Array,
    prandtl: Array,
    arrangement: Array,
    diameter_m: Array,
    fin_height_m: Array,
    fin_thickness_m: Array,
    fin_pitch_m: Array,
) -> Array:
    """Mean Nusselt number of a bank with annular fins after Th. E. Schmidt 1963.

    Parameters
    ----------
    reynolds, prandtl : Array
        Re in the narrowest section on the root diameter, Pr of the bulk [-].
    arrangement : Array
        1 for staggered, 0 for in-line.
    diameter_m : Array
        Root diameter [m].
    fin_height_m, fin_thickness_m, fin_pitch_m : Array
        Fin height, thickness and pitch [m].

    Returns
    -------
    Array
        Nu on the root diameter [-].

    Notes
    -----
    Nu = C Re^0.625 (A/A_bare)^-0.375 Pr^(1/3), C = 0.45 staggered and 0.30 in-line (Th. E. Schmidt,
    Kältetechnik 15 (1963) 98-102 and 370-378). A/A_bare 5 to 12, at least 4 rows.
    """
    constant = np.where(is_staggered(arrangement), 0.45, 0.30)
    ratio = fin_area_ratio(
        diameter_m=diameter_m,
        fin_height_m=fin_height_m,
        fin_thickness_m=fin_thickness_m,
        fin_pitch_m=fin_pitch_m,
    )
    return constant * np.exp(0.625 * log_reynolds(reynolds)) * ratio**-0.375 * np.cbrt(prandtl)


GANGULI_1985 = Method(
    slug="ganguli-1985",
    role="outside_heat_transfer",
    surfaces=("annular",),
    arrangements=("inline", "staggered"),
    gives="nusselt",
    function=ganguli_1985,
    inputs=("reynolds", "prandtl", "arrangement", "rows", *FIN_INPUTS),
    limits=(Limit(quantity="reynolds", at_least=1e3, at_most=1e5),),
    derived_limits=(
        DerivedLimit(
            name="outside surface over bare surface", value=fin_area_ratio, at_least=5.0, at_most=30.0
        ),
    ),
    source=(
        "A. Ganguli, S. S. Tung & J. Taborek, Parametric study of air-cooled heat exchanger finned tube "
        "geometry, AIChE Symp. Ser. 81 (1985) 122-128; constants by rows from the VDI Heat Atlas, 2nd "
        "ed. 2010, part M1"
    ),
    doubt=(
        "In-line banks let a large share of the stream through the clear lanes between fin tips; published "
        "methods differ there by a factor of 1.2 to 1.5."
    ),
    scatter_fraction=0.25,
    standard_uncertainty_fraction=0.15,
)

SCHMIDT_1963 = Method(
    slug="schmidt-1963",
    role="outside_heat_transfer",
    surfaces=("annular",),
    arrangements=("inline", "staggered"),
    gives="nusselt",
    function=schmidt_1963,
    inputs=("reynolds", "prandtl", "arrangement", *FIN_INPUTS),
    limits=(
        Limit(quantity="reynolds", at_least=1e3, at_most=4e4, arrangement="staggered"),
        Limit(quantity="reynolds", at_least=5e3, at_most=1e5, arrangement="inline"),
        Limit(quantity="rows", at_least=4.0, arrangement="staggered"),
    ),
    derived_limits=(
        DerivedLimit(
            name="outside surface over bare surface", value=fin_area_ratio, at_least=5.0, at_most=12.0
        ),
    ),
    source="Th. E. Schmidt, Der Wärmeübergang an Rippenrohre, Kältetechnik 15 (1963) 98-102 and 370-378",
    doubt="The staggered constant 0.45 is quoted from memory; against other laws it gives 0.75 to 1.03.",
    note="For four rows and more; no row factor.",
    scatter_fraction=0.25,
    standard_uncertainty_fraction=0.15,
)

RECORDS = (GANGULI_1985, SCHMIDT_1963)
