"""Plain tube banks, outside pressure drop: every method's record, and the default that joins two of them."""

import numpy as np

from crossbank_service.methods import (
    outside_plain_euler,
    outside_plain_gaddis,
    outside_plain_older,
)
from crossbank_service.methods._blend import elementwise, geometric, log_reynolds, rise, smoothstep
from crossbank_service.methods._layout import is_staggered
from crossbank_service.methods.outside_plain_euler import zukauskas_ulinskas_1988
from crossbank_service.methods.outside_plain_gaddis import (
    DIAGONAL_LIMIT,
    GEOMETRY_LIMITS,
    INPUTS,
    gaddis_gnielinski_1985,
    gaddis_gnielinski_1985_end_loss,
    gaddis_gnielinski_1985_resistances,
)
from crossbank_service.methods.record import Array, Limit, Method


@elementwise
def gaddis_zukauskas_blend(
    *,
    reynolds: Array,
    transverse_pitch_ratio: Array,
    longitudinal_pitch_ratio: Array,
    arrangement: Array,
    rows: Array,
    viscosity_ratio: Array | None = None,
) -> Array:
    """Loss coefficient of one row resistance of a plain bank, the default.

    Parameters
    ----------
    reynolds : Array
        Re in the narrowest section, on the tube diameter [-].
    transverse_pitch_ratio, longitudinal_pitch_ratio : Array
        a, b [-].
    arrangement : Array
        1 for staggered, 0 for in-line.
    rows : Array
        n [-].
    viscosity_ratio : Array, optional
        Viscosity at the surface over viscosity of the bulk [-]; left out: 1.

    Returns
    -------
    Array
        xi in velocity heads of the narrowest section [-]; counted as ``gaddis-gnielinski-1985`` counts.

    Notes
    -----
    Gaddis & Gnielinski 1985, bit for bit from Re 1500 to 2e5. Above, a smooth passage (2e5 to 4e5) to
    Zukauskas & Ulinskas 1988. Staggered with a >= 2 (weight from 1.5 on) and Re 40 to 800, the geometric mean
    of the two, with smooth passages at Re 20 to 40 and 800 to 1500: there the two part by up to a factor 2
    and the drag of a lone cylinder lies between. Both are compared as the bank's whole drop, whatever they
    count as resistances; below ten rows the inlet and outlet losses f_n F of the former stand in both.
    """
    quantities = {
        "reynolds": reynolds,
        "transverse_pitch_ratio": transverse_pitch_ratio,
        "longitudinal_pitch_ratio": longitudinal_pitch_ratio,
        "arrangement": arrangement,
        "rows": rows,
    }
    gaddis = gaddis_gnielinski_1985(**quantities, viscosity_ratio=viscosity_ratio)
    ln_re = log_reynolds(reynolds)
    wide = np.where(is_staggered(arrangement), smoothstep((transverse_pitch_ratio - 1.5) / 0.5), 0.0)
    middle = 0.5 * wide * rise(ln_re, 20.0, 40.0) * (1.0 - rise(ln_re, 800.0, 1500.0))
    # The two weights never meet: one is 0 wherever the other is not.
    weight = middle + rise(ln_re, 2e5, 4e5)
    if not np.any(weight > 0.0):
        return gaddis
    count = gaddis_gnielinski_1985_resistances(**quantities)
    # Without the losses of inlet and outlet a short bank's drop would fall where the law changes.
    euler = zukauskas_ulinskas_1988(**quantities) * (rows / count) + gaddis_gnielinski_1985_end_loss(
        **quantities
    )
    return geometric(gaddis, euler, weight)


GADDIS_ZUKAUSKAS_BLEND = Method(
    slug="gaddis-zukauskas-blend",
    role="outside_pressure_drop",
    surfaces=("plain",),
    arrangements=("inline", "staggered"),
    gives="loss_coefficient",
    function=gaddis_zukauskas_blend,
    inputs=INPUTS,
    options=("viscosity_ratio",),
    limits=(Limit(quantity="reynolds", at_least=1.0, at_most=2e6), *GEOMETRY_LIMITS),
    derived_limits=(DIAGONAL_LIMIT,),
    source=(
        "E. S. Gaddis, V. Gnielinski, Int. Chem. Eng. 25 (1985) 1-15; A. Zukauskas, R. Ulinskas, Heat "
        "Transfer in Tube Banks in Crossflow, Hemisphere 1988; joined here"
    ),
    doubt=(
        "Staggered with a of 2 and more at Re 30 to 1000 the two methods part by up to a factor 2: +-40 % "
        "there. Elsewhere 95 % of their differences at Re 1e3 to 1e5 lie within 30 %."
    ),
    note=(
        "Default. Equal to gaddis-gnielinski-1985 from Re 1500 to 2e5, and below except for staggered banks "
        "with a above 1.5: there the geometric mean with zukauskas-ulinskas-1988 between Re 40 and 800 (full "
        "from a = 2 on). zukauskas-ulinskas-1988 from Re 4e5. Passages are smooth in ln Re; below ten rows "
        "the inlet and outlet losses f_n of gaddis-gnielinski-1985 are added to zukauskas-ulinskas-1988."
    ),
    scatter_fraction=0.30,
    standard_uncertainty_fraction=0.14,
    resistances=gaddis_gnielinski_1985_resistances,
)

RECORDS: tuple[Method, ...] = (
    GADDIS_ZUKAUSKAS_BLEND,
    *outside_plain_gaddis.RECORDS,
    *outside_plain_euler.RECORDS,
    *outside_plain_older.RECORDS,
)


def auto_outside_pressure_drop() -> str:
    """Slug of the method ``auto`` stands for on a plain bank: one for every geometry and phase."""
    return GADDIS_ZUKAUSKAS_BLEND.slug


__all__ = ["RECORDS", "auto_outside_pressure_drop", "gaddis_zukauskas_blend"]
