"""Plain tube banks, outside heat transfer: a boundary-layer model for comparison, and the single cylinder."""

import numpy as np

from crossbank_service.methods._blend import LEAST_REYNOLDS, elementwise
from crossbank_service.methods._layout import free_area_ratio, is_staggered
from crossbank_service.methods.record import Array, DerivedLimit, Limit, Method

_LEAST_DENOMINATOR = 0.05


@elementwise
def khan_2006(
    *,
    reynolds: Array,
    prandtl: Array,
    transverse_pitch_ratio: Array,
    longitudinal_pitch_ratio: Array,
    arrangement: Array,
) -> Array:
    """Mean Nusselt number of a plain bank after Khan, Culham & Yovanovich 2006, for comparison.

    Parameters
    ----------
    reynolds : Array
        Re in the narrowest section, on the tube diameter, film properties [-].
    prandtl : Array
        Pr of the film [-].
    transverse_pitch_ratio, longitudinal_pitch_ratio : Array
        a, b [-].
    arrangement : Array
        1 for staggered, 0 for in-line.

    Returns
    -------
    Array
        Nu on the tube diameter of a deep bank [-].

    Notes
    -----
    Nu = C1 Re^(1/2) Pr^(1/3) with C1 = (0.25 + exp(-0.55 b)) a^0.285 b^0.212 in-line and 0.61 a^0.091
    b^0.053/(1 - 2 exp(-1.09 b)) staggered (W. A. Khan, J. R. Culham, M. M. Yovanovich, Int. J. Heat Mass
    Transfer 49 (2006) 4831-4838). 1.05 <= a, b <= 3. The staggered form is singular near b = 0.64; its
    denominator is held at 0.05.
    """
    ln_a, b = np.log(transverse_pitch_ratio), longitudinal_pitch_ratio
    ln_b = np.log(b)
    inline = (0.25 + np.exp(-0.55 * b)) * np.exp(0.285 * ln_a + 0.212 * ln_b)
    denominator = np.maximum(1.0 - 2.0 * np.exp(-1.09 * b), _LEAST_DENOMINATOR)
    staggered = 0.61 * np.exp(0.091 * ln_a + 0.053 * ln_b) / denominator
    coefficient = np.where(is_staggered(arrangement), staggered, inline)
    return coefficient * np.sqrt(np.maximum(reynolds, LEAST_REYNOLDS)) * np.cbrt(prandtl)


@elementwise
def churchill_bernstein_1977(
    *,
    reynolds: Array,
    prandtl: Array,
    transverse_pitch_ratio: Array,
    longitudinal_pitch_ratio: Array,
    arrangement: Array,
) -> Array:
    """Nusselt number of a single cylinder after Churchill & Bernstein 1977, at the bank's approach velocity.

    Parameters
    ----------
    reynolds : Array
        Re in the narrowest section, on the tube diameter, film properties [-]; taken to the empty duct
        inside.
    prandtl : Array
        Pr of the film [-].
    transverse_pitch_ratio, longitudinal_pitch_ratio : Array
        a, b [-], for the conversion alone.
    arrangement : Array
        1 for staggered, 0 for in-line.

    Returns
    -------
    Array
        Nu on the tube diameter [-].

    Notes
    -----
    Nu = 0.3 + 0.62 Re^(1/2) Pr^(1/3)/(1 + (0.4/Pr)^(2/3))^(1/4) (1 + (Re/282000)^(5/8))^(4/5) (S. W.
    Churchill, M. Bernstein, J. Heat Transfer 99 (1977) 300-306), Re Pr > 0.2.
    """
    approach = np.maximum(
        reynolds * free_area_ratio(transverse_pitch_ratio, longitudinal_pitch_ratio, arrangement),
        LEAST_REYNOLDS,
    )
    fluid = np.cbrt(prandtl) / np.sqrt(np.sqrt(1.0 + (0.4 / prandtl) ** (2.0 / 3.0)))
    return 0.3 + 0.62 * np.sqrt(approach) * fluid * (1.0 + (approach / 282000.0) ** 0.625) ** 0.8


def _approach_peclet(
    *,
    reynolds: Array,
    prandtl: Array,
    transverse_pitch_ratio: Array,
    longitudinal_pitch_ratio: Array,
    arrangement: Array,
    **_others: Array,
) -> Array:
    sigma = free_area_ratio(
        np.asarray(transverse_pitch_ratio), np.asarray(longitudinal_pitch_ratio), np.asarray(arrangement)
    )
    return np.asarray(reynolds) * np.asarray(prandtl) * sigma


_INPUTS = ("reynolds", "prandtl", "transverse_pitch_ratio", "longitudinal_pitch_ratio", "arrangement")

KHAN_2006 = Method(
    slug="khan-2006",
    role="outside_heat_transfer",
    surfaces=("plain",),
    arrangements=("inline", "staggered"),
    gives="nusselt",
    function=khan_2006,
    inputs=_INPUTS,
    limits=(
        Limit(quantity="transverse_pitch_ratio", at_least=1.05, at_most=3.0),
        Limit(quantity="longitudinal_pitch_ratio", at_least=1.05, at_most=3.0),
        Limit(quantity="reynolds", at_most=1e5),
    ),
    source="W. A. Khan, J. R. Culham, M. M. Yovanovich, Int. J. Heat Mass Transfer 49 (2006) 4831-4838",
    doubt=(
        "Constants from memory, held against other methods: within 10 to 40 %, 35 % high at staggered 1.5 x "
        "1.3, 30 to 60 % low above Re 1e5, where the range is cut here."
    ),
    note="A laminar boundary-layer model; for comparison only. No row factor: every row alike.",
    scatter_fraction=0.40,
    standard_uncertainty_fraction=0.20,
    properties_at="film",
)

CHURCHILL_BERNSTEIN_1977 = Method(
    slug="churchill-bernstein-1977",
    role="outside_heat_transfer",
    surfaces=("plain",),
    arrangements=("inline", "staggered"),
    gives="nusselt",
    function=churchill_bernstein_1977,
    inputs=_INPUTS,
    derived_limits=(
        DerivedLimit(
            name="Reynolds number of the approach times the Prandtl number",
            value=_approach_peclet,
            at_least=0.2,
        ),
    ),
    source="S. W. Churchill, M. Bernstein, J. Heat Transfer 99 (1977) 300-306",
    doubt="The scatter of 20 % is from memory and is that of a single cylinder, not of a bank.",
    note=(
        "A single cylinder in the empty duct's velocity: the limit of a bank with very wide pitches. "
        "Neighbouring tubes are not in it; every row alike."
    ),
    scatter_fraction=0.20,
    standard_uncertainty_fraction=0.10,
    properties_at="film",
)

RECORDS = (KHAN_2006, CHURCHILL_BERNSTEIN_1977)
