"""Where the inside stream goes: rows grouped in passes, and the direction of each pass along the tubes."""

from dataclasses import dataclass
from functools import cached_property


@dataclass(frozen=True)
class Circuit:
    """The inside stream's way through the rows, one for all cases of a group.

    Attributes
    ----------
    rows_per_pass : tuple of int
        Rows of each pass, first pass first; rows of a pass lie side by side.
    against : bool
        True when the first pass lies in the last rows (overall counter-cross).
    """

    rows_per_pass: tuple[int, ...]
    against: bool

    @property
    def rows(self) -> int:
        """Rows of the bank."""
        return sum(self.rows_per_pass)

    @property
    def passes(self) -> int:
        """Passes of the inside stream."""
        return len(self.rows_per_pass)

    @cached_property
    def pass_of_row(self) -> tuple[int, ...]:
        """Pass of each row, both counted from 0, rows along the outside stream."""
        order = [p for p, n in enumerate(self.rows_per_pass) for _ in range(n)]
        return tuple(reversed(order)) if self.against else tuple(order)

    @cached_property
    def rows_of_pass(self) -> tuple[tuple[int, ...], ...]:
        """Rows (from 0) of each pass."""
        return tuple(tuple(r for r, q in enumerate(self.pass_of_row) if q == p) for p in range(self.passes))

    def backwards(self, p: int) -> bool:
        """Whether pass ``p`` runs against the first pass along the tubes: passes alternate."""
        return p % 2 == 1
