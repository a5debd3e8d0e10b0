"""What a method is: one function and one record beside it."""

from collections.abc import Callable
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

Array = NDArray[np.float64]
Mask = NDArray[np.bool_]


@dataclass(frozen=True, kw_only=True)
class Limit:
    """Range of validity in one quantity of the nomenclature (closed; None means open-ended).

    ``arrangement`` names the one arrangement the limit is about; None means both.
    """

    quantity: str
    at_least: float | None = None
    at_most: float | None = None
    arrangement: str | None = None


@dataclass(frozen=True, kw_only=True)
class DerivedLimit:
    """Range of validity in something computed from the inputs, such as the diagonal pitch ratio.

    Attributes
    ----------
    name : str
        What is limited, in words that stand at the head of a sentence.
    value : callable
        Takes the method's inputs (and more) as keyword arguments, returns an array.
    at_least, at_most : float or None
        Closed limits; None means open-ended.
    arrangement : str or None
        The one arrangement the limit is about; None means both.
    """

    name: str
    value: Callable[..., Array]
    at_least: float | None = None
    at_most: float | None = None
    arrangement: str | None = None


@dataclass(frozen=True, kw_only=True)
class Method:
    """One published correlation.

    Attributes
    ----------
    slug : str
        Author and year, such as ``zukauskas-1987``.
    role : str
        ``outside_heat_transfer``, ``outside_pressure_drop``, ``inside_heat_transfer`` or
        ``inside_pressure_drop``.
    surfaces : tuple of str
        What it is for: ``plain``, ``annular``, ``serrated``, ``plate`` outside; ``single-phase``,
        ``condensing`` inside.
    arrangements : tuple of str
        ``inline`` and/or ``staggered`` outside; empty inside.
    gives : str
        Name of the result in the nomenclature.
    function : callable
        Takes exactly the ``inputs`` (and any of the ``options``) as keyword arguments, floats or arrays
        that broadcast together, returns an array. Never raises on numbers; extrapolates finitely.
    inputs, options : tuple of str
        Names in the nomenclature; options have defaults in the function's signature.
    limits : tuple of Limit
        Published range of validity, as data.
    derived_limits : tuple of DerivedLimit
        The part of it that is no box in one quantity.
    source, doubt, note : str
        Where it is from (with equation or table), what is doubtful about it, choices made.
    scatter_fraction : float
        Published scatter of data about the method, as a fraction (0.15 for +-15 %).
    standard_uncertainty_fraction : float
        The relative standard uncertainty used for propagation.
    properties_at : str
        ``bulk`` or ``film``: where the caller evaluates the fluid.
    row_share : callable or None
        Outside heat transfer only: the local coefficient of a row over the bank's mean, from
        ``row`` (1 counts from the inlet) and the method's own inputs; None: every row alike.
    resistances : callable or None
        Outside pressure drop only: how many row resistances the bank has (None: ``rows``).
    fixed_loss : callable or None
        Outside pressure drop only: loss in velocity heads that does not grow with the rows.
    """

    slug: str
    role: str
    surfaces: tuple[str, ...]
    arrangements: tuple[str, ...] = ()
    gives: str
    function: Callable[..., Array]
    inputs: tuple[str, ...]
    options: tuple[str, ...] = ()
    limits: tuple[Limit, ...] = ()
    derived_limits: tuple[DerivedLimit, ...] = ()
    source: str
    doubt: str | None = None
    note: str | None = None
    scatter_fraction: float
    standard_uncertainty_fraction: float
    properties_at: str = "bulk"
    row_share: Callable[..., Array] | None = None
    resistances: Callable[..., Array] | None = None
    fixed_loss: Callable[..., Array] | None = None
