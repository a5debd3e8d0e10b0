"""Plain text tables: labelled blocks and grids, sized to what they hold."""

import textwrap
from collections.abc import Sequence

WIDTH = 100

Line = tuple[str, str, str]
"""Label, value, unit."""


def block(title: str, lines: Sequence[Line]) -> str:
    """Lay out label, value and unit under a title, values flush right."""
    labels = max((len(label) for label, _, _ in lines), default=0)
    values = max((len(value) for _, value, _ in lines), default=0)
    body = [f"  {label:<{labels}}  {value:>{values}} {unit}".rstrip() for label, value, unit in lines]
    return "\n".join([title, *body])


def grid(title: str, heads: Sequence[tuple[str, str]], rows: Sequence[Sequence[str]]) -> str:
    """Lay out columns with a head and a unit each; cells flush right."""
    widths = [
        max(len(head), len(unit), *(len(row[i]) for row in rows)) if rows else max(len(head), len(unit))
        for i, (head, unit) in enumerate(heads)
    ]

    def line(cells: Sequence[str]) -> str:
        return (
            "  " + "  ".join(f"{cell:>{width}}" for cell, width in zip(cells, widths, strict=True)).rstrip()
        )

    return "\n".join(
        [
            title,
            line([head for head, _ in heads]),
            line([unit for _, unit in heads]),
            *(line(row) for row in rows),
        ]
    )


def paragraph(text: str, *, first: str = "  ", then: str = "  ") -> str:
    """Wrap a text, the first line after ``first`` and the others after ``then``."""
    return "\n".join(textwrap.wrap(text, WIDTH, initial_indent=first, subsequent_indent=then))
