"""What a criterion is: a threshold with its source and trust, and how a value is graded against it."""

from dataclasses import dataclass
from typing import Literal

import numpy as np
from numpy.typing import NDArray

from crossbank_service.methods.record import Array

Values = Array | float
"""Numbers a function takes: float64 arrays that broadcast together, case axis first, or a plain float."""

Codes = NDArray[np.int8]
Answers = Codes | int
Sense = Literal["at-most", "at-least"]
Trust = Literal["confirmed", "derived", "consistent", "memory", "practice", "own"]

WITHIN, NEAR, BEYOND, UNASSESSED = 0, 1, 2, 3
VERDICTS = ("within", "near", "beyond", "unassessed")

UNKNOWN, NO, YES = -1, 0, 1
"""Answers to a yes-or-no question about the plant; what nobody has stated is UNKNOWN, never guessed."""

TRUST_WORDS: dict[Trust, str] = {
    "confirmed": "read in public and equal to a second place",
    "derived": "derived, and checked by a second route",
    "consistent": "from memory, with a consistency check passed",
    "memory": "from memory, not read at the source",
    "practice": "common practice, no source",
    "own": "a rule of this service",
}


@dataclass(frozen=True, kw_only=True)
class Criterion:
    """One threshold of one check.

    Attributes
    ----------
    slug : str
        The criterion's own word, such as ``acid-dew-point-margin``.
    check : str
        The check it serves, such as ``acid-dew-point``.
    quantity, unit : str
        What is compared, in words, and its SI unit ('' for a bare number).
    sense : str
        ``at-most`` or ``at-least``: the side of the limit that is safe.
    near : float
        At this or safer is within: where ``within`` ends.
    beyond : float
        Worse than this is beyond; from here to ``near`` is near.
    source, trust : str
        Where the threshold comes from, and how far the source was checked (a key of ``TRUST_WORDS``).
    needs : tuple of str
        Inputs without which the check is unassessed.
    caution : str or None
        What a person must be told whatever the verdict.
    """

    slug: str
    check: str
    quantity: str
    unit: str
    sense: Sense
    near: float
    beyond: float
    source: str
    trust: Trust
    needs: tuple[str, ...] = ()
    caution: str | None = None

    @property
    def attribution(self) -> str:
        """Source and trust in one line, as a finding prints it."""
        words = TRUST_WORDS[self.trust]
        return words if self.source == words else f"{self.source} ({words})"

    def grade(self, value: Values, expanded_uncertainty: Values = 0.0) -> Codes:
        """Grade values against this criterion; see `grade`."""
        return grade(
            value, self.beyond, self.near, sense=self.sense, expanded_uncertainty=expanded_uncertainty
        )


def margin(value: Values, limit: Values, sense: Sense) -> Array:
    """Distance from the limit, positive on the safe side.

    Parameters
    ----------
    value, limit : array_like
        The value and its limit [same unit], broadcast together.
    sense : str
        ``at-most`` or ``at-least``.

    Returns
    -------
    Array
        Margin [same unit].
    """
    value = np.asarray(value, dtype=np.float64)
    return np.asarray(limit - value if sense == "at-most" else value - limit, dtype=np.float64)


def grade(
    value: Values,
    limit: Values,
    near_limit: Values,
    *,
    sense: Sense,
    expanded_uncertainty: Values = 0.0,
) -> Codes:
    """Grade values as within, near, beyond or unassessed.

    Parameters
    ----------
    value, limit, near_limit : array_like
        Value, limit and near limit [same unit], broadcast together.
    sense : str
        ``at-most`` or ``at-least``.
    expanded_uncertainty : array_like
        Half width of the 95 % interval of the value [same unit]; 0 where none is claimed.

    Returns
    -------
    Codes
        Index into ``VERDICTS``.

    Notes
    -----
    Where the interval straddles the limit the grade is at best near (a rule of this service). A value that
    is not a finite number is unassessed: missing data never read as within.
    """
    value, limit, near_limit, spread = np.broadcast_arrays(
        np.asarray(value, dtype=np.float64),
        np.asarray(limit, dtype=np.float64),
        np.asarray(near_limit, dtype=np.float64),
        np.asarray(expanded_uncertainty, dtype=np.float64),
    )
    known = np.isfinite(value) & np.isfinite(limit) & np.isfinite(near_limit)
    # compared directly, not by a margin: a difference would round values that sit on the limit
    sign = -1.0 if sense == "at-most" else 1.0
    safe = sign * value >= sign * near_limit
    allowed = sign * value >= sign * limit
    straddles = (value - spread < limit) & (limit < value + spread)
    codes = np.where(safe & allowed & ~straddles, WITHIN, np.where(allowed, NEAR, BEYOND))
    return np.where(known, codes, UNASSESSED).astype(np.int8)


def worst(*codes: Codes) -> Codes:
    """Combine grades: beyond before unassessed before near before within.

    Parameters
    ----------
    codes : Codes
        Indices into ``VERDICTS``, broadcast together.

    Returns
    -------
    Codes
        The worst grade of each place.
    """
    rank = np.array([0, 1, 3, 2], dtype=np.int8)
    of_rank = np.array([WITHIN, NEAR, UNASSESSED, BEYOND], dtype=np.int8)
    ranks = np.broadcast_arrays(*(rank[np.asarray(c, dtype=np.int8)] for c in codes))
    highest = ranks[0]
    for other in ranks[1:]:
        highest = np.maximum(highest, other)
    return np.asarray(of_rank[highest], dtype=np.int8)
