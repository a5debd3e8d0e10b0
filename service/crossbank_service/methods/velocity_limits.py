"""Velocity limits on both sides, and what a velocity costs in erosion."""

from dataclasses import dataclass

import numpy as np

from crossbank_service.methods.criterion import Codes, Trust, Values, grade, worst
from crossbank_service.methods.record import Array


@dataclass(frozen=True, kw_only=True)
class VelocityLimit:
    """Usual velocity range of one service.

    Attributes
    ----------
    slug, name : str
        Word of the house, and words for people.
    highest_m_s : float
        Upper limit [m/s].
    lowest_m_s : float or None
        Below it deposits settle or the tube fouls [m/s].
    section : str
        ``narrowest-section``, ``face``, ``tube`` or ``header``: where the velocity is taken.
    source, trust : str
        Where it is from, and how far checked.
    """

    slug: str
    name: str
    highest_m_s: float
    lowest_m_s: float | None = None
    section: str
    source: str = "common practice, no source"
    trust: Trust = "practice"

    def grade(self, velocity_m_s: Values) -> Codes:
        """Grade velocities against this limit; see `grade_velocity`."""
        return grade_velocity(velocity_m_s, self.highest_m_s, self.lowest_m_s)


def _outside(
    slug: str, name: str, high: float, low: float | None = None, section: str = "narrowest-section"
) -> VelocityLimit:
    return VelocityLimit(slug=slug, name=name, highest_m_s=high, lowest_m_s=low, section=section)


OUTSIDE_VELOCITIES = (
    _outside("clean-air", "clean air, plain tubes", 15.0),
    _outside("clean-air-finned", "clean air, finned coil", 4.0, section="face"),
    _outside("wet-cooling-finned", "cooling coil that condenses moisture", 2.5, section="face"),
    _outside("gas-fired", "flue gas of gas firing", 30.0),
    _outside("oil-fired", "flue gas of oil firing", 20.0),
    _outside("coal-low-ash", "flue gas of coal, little ash", 15.0, 5.0),
    _outside("coal-average-ash", "flue gas of coal, average ash", 12.0, 5.0),
    _outside("coal-high-ash", "flue gas of coal, much or quartz-rich ash", 10.0, 5.0),
    _outside("biomass-sand", "flue gas of biomass with sand", 10.0, 5.0),
    _outside("dusty-process", "dusty process gas", 10.0, 5.0),
)
"""Upper ends of the usual ranges: 0.8 of the limit is their lower end. Which dust is the caller's to say."""

_INSIDE = (
    ("copper", 0.9, 1.8),
    ("admiralty", 1.0, 2.0),
    ("aluminium-brass", 1.0, 2.3),
    ("copper-nickel-90-10", 1.0, 3.0),
    ("copper-nickel-70-30", 1.5, 4.5),
    ("carbon-steel", 0.9, 2.5),
    ("stainless-304h", 1.0, 4.5),
    ("titanium", 1.0, 6.0),
)
INSIDE_VELOCITIES = (
    *(
        VelocityLimit(
            slug=slug, name=f"liquid in {slug} tubes", highest_m_s=high, lowest_m_s=low, section="tube"
        )
        for slug, low, high in _INSIDE
    ),
    VelocityLimit(
        slug="boiler-feed-water", name="boiler feed water", highest_m_s=1.8, lowest_m_s=0.5, section="tube"
    ),
    VelocityLimit(slug="steam-tube-inlet", name="steam entering tubes", highest_m_s=45.0, section="tube"),
    VelocityLimit(slug="steam-header", name="saturated steam in headers", highest_m_s=40.0, section="header"),
)
"""Liquids by tube metal, and steam; glycol and treated loops may run down to ``TREATED_LOOP_LEAST_M_S``."""

TREATED_LOOP_LEAST_M_S = 0.3


def velocity_limit(slug: str, *, inside: bool) -> VelocityLimit | None:
    """Velocity limit by slug on one side; None where the house has none, so erosion stays unassessed."""
    return next((v for v in (INSIDE_VELOCITIES if inside else OUTSIDE_VELOCITIES) if v.slug == slug), None)


def grade_velocity(velocity_m_s: Values, highest_m_s: Values, lowest_m_s: Values | None = None) -> Codes:
    """Grade velocities against an upper and a lower limit.

    Parameters
    ----------
    velocity_m_s : array_like
        Highest velocity of the service, peaks and lanes included [m/s].
    highest_m_s : array_like
        Upper limit [m/s].
    lowest_m_s : array_like or None
        Lower limit [m/s]; None where nothing settles.

    Returns
    -------
    Codes
        Index into the verdict words.

    Notes
    -----
    Within to 0.8 of the upper limit, near to the limit, beyond above it; below the lower limit near (house
    rule).
    """
    highest = np.asarray(highest_m_s, dtype=np.float64)
    codes = grade(velocity_m_s, highest, 0.8 * highest, sense="at-most")
    if lowest_m_s is None:
        return codes
    return worst(codes, grade(velocity_m_s, -1.0, lowest_m_s, sense="at-least"))


def erosion_life_ratio(velocity_m_s: Values, reference_velocity_m_s: Values, exponent: Values = 3.3) -> Array:
    """How many times faster ash wears a tube than at a reference velocity.

    Parameters
    ----------
    velocity_m_s, reference_velocity_m_s : array_like
        Gas velocity and the velocity compared with, at the same section [m/s].
    exponent : array_like
        Exponent of the velocity.

    Returns
    -------
    Array
        Wear rate over the reference wear rate; life is shorter by the same factor.

    Notes
    -----
    Wear ~ V^n with n 3.3 to 3.5 for fly ash (published range 2 to 4.5). Ash finer than about 20 micrometres
    mostly follows the gas and wears less.
    """
    speed = np.maximum(np.asarray(velocity_m_s, dtype=np.float64), 0.0)
    reference = np.maximum(np.asarray(reference_velocity_m_s, dtype=np.float64), 1e-6)
    return np.asarray((speed / reference) ** np.asarray(exponent, dtype=np.float64))


def free_area_factor(velocity_m_s: Values, highest_m_s: Values, share_of_limit: Values = 0.8) -> Array:
    """Factor by which the free area must grow, or the flow fall, to bring a velocity within.

    Parameters
    ----------
    velocity_m_s, highest_m_s : array_like
        Velocity and its upper limit [m/s].
    share_of_limit : array_like
        Wanted share of the limit.

    Returns
    -------
    Array
        Factor on the free area, 1 where nothing need change.
    """
    wanted = np.maximum(np.asarray(highest_m_s, dtype=np.float64) * share_of_limit, 1e-6)
    return np.asarray(np.maximum(np.asarray(velocity_m_s, dtype=np.float64) / wanted, 1.0))
