"""What the core refuses, and why: errors that know quantities and fields but no HTTP.

The tree::

    CoreError                 code        http maps it to
      InvalidInput            invalid-input   422
      Impossible              impossible      422
      OutOfRange              out-of-range    422 (only with ``strict``)
      NotConverged            not-converged   422
"""

from dataclasses import dataclass, field


@dataclass(frozen=True, kw_only=True)
class Fault:
    """One offending field of a request.

    Attributes
    ----------
    pointer : str
        JSON Pointer (RFC 6901) into the request, such as ``/bank/layout/rows``.
    detail : str
        One sentence: what is wrong and what would be accepted.
    given : float or int or str or None
        The value that was given.
    unit : str or None
        Unit of ``given`` and the limits, such as ``m``.
    at_least, at_most : float or None
        The accepted limits, in the same unit.
    one_of : tuple of str or None
        The accepted words.
    """

    pointer: str
    detail: str
    given: float | int | str | None = None
    unit: str | None = None
    at_least: float | None = None
    at_most: float | None = None
    one_of: tuple[str, ...] | None = None


@dataclass
class CoreError(Exception):
    """Base of everything the core refuses; ``faults`` names each field."""

    detail: str
    faults: list[Fault] = field(default_factory=list)
    code = "internal"

    def __str__(self) -> str:
        return self.detail


class InvalidInput(CoreError):
    """The request breaks a rule the schema alone cannot state (either-or pairs, unknown names)."""

    code = "invalid-input"


class Impossible(CoreError):
    """Geometry or physics of the request contradict themselves."""

    code = "impossible"


class OutOfRange(CoreError):
    """A method was asked outside its range and the request was strict."""

    code = "out-of-range"


class NotConverged(CoreError):
    """The solver did not reach its tolerance; the detail holds the last residual."""

    code = "not-converged"
