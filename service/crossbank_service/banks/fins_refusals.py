"""Finned tubes that cannot be built: reasons as data, bank by bank, with the field and what would do."""

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from crossbank_service.banks.fins import TubeLayout, neighbour_distance

Array = NDArray[np.float64]
Mask = NDArray[np.bool_]

# Lengths that touch are no overlap; sums of written-out millimetres miss equality by rounding.
_ROUNDING = 1e-9


@dataclass(frozen=True)
class Refusal:
    """One reason why some of N banks cannot be built.

    Attributes
    ----------
    reason : str
        Slug of the reason.
    field : str
        The field to change, by its name on the wire.
    detail : str
        One sentence for people: what is wrong and what would be accepted.
    where : Mask
        The banks it holds for.
    given, at_least, at_most : Array or None
        The value of the field and the limit it breaks [m].
    """

    reason: str
    field: str
    detail: str
    where: Mask
    given: Array
    at_least: Array | None = None
    at_most: Array | None = None


def layout_refusals(*, layout: TubeLayout, envelope_diameter: Array) -> tuple[Refusal, ...]:
    """Find the banks whose tubes, fins included, would stand in one another.

    Parameters
    ----------
    layout : TubeLayout
        Where the tubes stand.
    envelope_diameter : Array
        Over the fins; of plates the collar's [m].

    Returns
    -------
    tuple of Refusal
        Every reason, each with the banks it holds for (perhaps none). Tubes that touch are refused nowhere
        here.
    """
    least = envelope_diameter * (1.0 - _ROUNDING)
    staggered = layout.staggered > 0.5
    second_row = layout.rows > 1.5
    third_row = layout.rows > 2.5
    along = np.where(staggered, 2.0, 1.0) * layout.longitudinal_pitch
    short = (along < least) & np.where(staggered, third_row, second_row)
    beside = np.sqrt(np.maximum(envelope_diameter**2 - 0.25 * layout.transverse_pitch**2, 0.0))
    return (
        Refusal(
            reason="overlap-across",
            field="transverse_pitch_m",
            detail="Tubes of a row, fins included, overlap; the pitch must reach the diameter over the fins.",
            where=layout.transverse_pitch < least,
            given=layout.transverse_pitch,
            at_least=envelope_diameter,
        ),
        Refusal(
            reason="overlap-diagonal",
            field="longitudinal_pitch_m",
            detail="Tubes of neighbouring staggered rows, fins included, overlap; move the rows apart.",
            where=staggered & second_row & (neighbour_distance(layout) < least),
            given=layout.longitudinal_pitch,
            at_least=beside,
        ),
        Refusal(
            reason="overlap-along",
            field="longitudinal_pitch_m",
            detail="Tubes that stand behind one another, fins included, overlap; move the rows apart.",
            where=short,
            given=layout.longitudinal_pitch,
            at_least=np.where(staggered, 0.5, 1.0) * envelope_diameter,
        ),
    )


def fin_refusals(*, fin_thickness: Array, fin_pitch: Array) -> tuple[Refusal, ...]:
    """Find fins, annular, serrated or plate, that leave no gap.

    Parameters
    ----------
    fin_thickness, fin_pitch : Array
        Thickness; centre to centre [m].

    Returns
    -------
    tuple of Refusal
        Every reason, each with the fins it holds for (perhaps none).
    """
    return (
        Refusal(
            reason="no-fin-gap",
            field="pitch_m",
            detail="The fin pitch is centre to centre and must be more than the fin thickness.",
            where=fin_pitch <= fin_thickness * (1.0 + _ROUNDING),
            given=fin_pitch,
            at_least=fin_thickness,
        ),
        Refusal(
            reason="no-fin-thickness",
            field="thickness_m",
            detail="A fin has a thickness above zero; leave the fins out for a plain tube.",
            where=fin_thickness <= 0.0,
            given=fin_thickness,
            at_least=np.zeros_like(fin_thickness),
        ),
    )


def serration_refusals(
    *, outer_diameter: Array, fin_height: Array, segment_width: Array, cut_depth: Array
) -> tuple[Refusal, ...]:
    """Find serrated fins whose segments cannot be cut.

    Parameters
    ----------
    outer_diameter : Array
        Tube diameter at the root of the fins [m].
    fin_height : Array
        Tube to tip [m].
    segment_width, cut_depth : Array
        Width of a segment; depth of the cuts from the tip [m].

    Returns
    -------
    tuple of Refusal
        Every reason, each with the fins it holds for (perhaps none).
    """
    circumference = np.pi * (outer_diameter + 2.0 * np.maximum(fin_height - cut_depth, 0.0))
    return (
        Refusal(
            reason="cut-beyond-root",
            field="cut_depth_m",
            detail="The cuts start at the tip and go no deeper than the fin is high.",
            where=cut_depth > fin_height * (1.0 + _ROUNDING),
            given=cut_depth,
            at_most=fin_height,
        ),
        Refusal(
            reason="segment-beyond-circumference",
            field="segment_width_m",
            detail="At least two segments must fit round the circumference they stand on; narrow them.",
            where=segment_width > 0.5 * circumference * (1.0 + _ROUNDING),
            given=segment_width,
            at_most=0.5 * circumference,
        ),
    )
