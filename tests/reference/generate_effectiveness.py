"""Write effectiveness.toml: P of tube banks from the matrix exponential of the row equations at 60 digits.

Independent of the service: tube temperatures themselves (not their deficit), one exponential over the whole
length (no doubling), boundary conditions solved at 60 digits so that growing exponentials do no harm.
Run with ``python tests/reference/generate_effectiveness.py``; needs mpmath, which the tests do not.
"""

import importlib
from pathlib import Path
from typing import Any

# loaded by name: the tests do without it and it has no types
mp: Any = importlib.import_module("mpmath").mp
mp.dps = 60

Case = tuple[str, str, tuple[int, ...], bool, str, bool, tuple[str, ...] | None]

# ntu, C, rows_per_pass, counter, connection, alternate, row_shares
CASES: tuple[Case, ...] = (
    ("0.001", "0.5", (2, 2), True, "mixed", True, None),
    ("0.5", "0.75", (3,), True, "mixed", True, None),
    ("1", "0.5", (6,), True, "mixed", True, None),
    ("2", "0.5", (4,), True, "mixed", True, None),
    ("2", "0.5", (2, 2), True, "mixed", True, None),
    ("2", "0.5", (2, 2), True, "matching", True, None),
    ("2", "0.5", (2, 2), True, "nested", True, None),
    ("2", "0.5", (2, 2), True, "mixed", False, None),
    ("2", "0.5", (2, 2), True, "matching", False, None),
    ("2", "0.5", (2, 2), True, "mixed", True, ("0.4", "0.3", "0.2", "0.1")),
    ("2", "0.5", (2, 2), False, "mixed", True, None),
    ("2", "1", (1, 1, 1), True, "mixed", True, None),
    ("3", "0.3", (1, 1, 1, 1), True, "mixed", True, None),
    ("3", "1.7", (3, 2), True, "mixed", True, None),
    ("3", "1.7", (1, 2, 2), False, "mixed", True, None),
    ("4", "0.25", (2, 2, 2, 2), True, "mixed", True, None),
    ("1.5", "1.8", (1, 1, 1, 1), True, "mixed", True, None),
    ("6", "0.9", (3, 3, 3), False, "nested", True, None),
    ("2", "0.000001", (2, 2), True, "mixed", True, None),
    ("5", "12", (4, 4), True, "mixed", True, None),
    ("5", "12", (4, 4), True, "nested", True, None),
    ("8", "30", (2, 2, 2), True, "matching", True, None),
    ("40", "0.8", (2, 2), True, "mixed", True, None),
)


def pass_rows(rows_per_pass: tuple[int, ...], *, counter: bool) -> list[list[int]]:
    """Rows of each pass, 0 at the gas inlet."""
    rows = sum(rows_per_pass)
    blocks: list[list[int]] = []
    start = 0
    for count in rows_per_pass:
        block = list(range(start, start + count))
        blocks.append(sorted(rows - 1 - r for r in block) if counter else block)
        start += count
    return blocks


def _row_matrix(c: Any, gain: list[Any], phi: list[Any], direction: list[int]) -> Any:
    """Matrix A of t' = A t."""
    rows = len(gain)
    # gas ahead of each row as a combination of the tube temperatures
    ahead = [[mp.mpf(0)] * rows]
    for r in range(rows):
        ahead.append([(1 - gain[r]) * v + (gain[r] if s == r else 0) for s, v in enumerate(ahead[-1])])
    a = mp.matrix(rows, rows)
    for r in range(rows):
        for s in range(rows):
            a[r, s] = direction[r] * c / phi[r] * gain[r] * (ahead[r][s] - (1 if s == r else 0))
    return a


def effectiveness(case: Case) -> Any:
    """P = (1 - mean last outlet)/C."""
    ntu_text, ratio_text, rows_per_pass, counter, connection, alternate, row_shares = case
    ntu, c = mp.mpf(ntu_text), mp.mpf(ratio_text)
    rows = sum(rows_per_pass)
    shares = [mp.mpf(1) / rows] * rows if row_shares is None else [mp.mpf(s) for s in row_shares]
    gain = [1 - mp.exp(-ntu * s) for s in shares]
    blocks = pass_rows(rows_per_pass, counter=counter)
    phi, direction = [mp.mpf(1)] * rows, [1] * rows
    for index, block in enumerate(blocks):
        for r in block:
            phi[r] = mp.mpf(1) / len(block)
            direction[r] = -1 if alternate and index % 2 else 1
    e = mp.expm(_row_matrix(c, gain, phi, direction))
    eye = mp.eye(rows)
    start = {r: (eye if direction[r] > 0 else e)[r, :] for r in range(rows)}
    end = {r: (e if direction[r] > 0 else eye)[r, :] for r in range(rows)}
    left, right = mp.matrix(rows, rows), mp.matrix(rows, 1)
    for index, block in enumerate(blocks):
        for place, r in enumerate(block):
            left[r, :] = start[r]
            if index == 0:
                right[r] = 1
                continue
            previous = blocks[index - 1]
            if connection == "mixed":
                sources = previous
            else:
                sources = [previous[place] if connection == "matching" else previous[::-1][place]]
            for s in sources:
                left[r, :] = left[r, :] - end[s] / len(sources)
    solution = mp.lu_solve(left, right)
    outlet = sum((end[r] * solution)[0] for r in blocks[-1]) / len(blocks[-1])
    return (1 - outlet) / c


def main() -> None:
    """Write the file beside this one."""
    lines = [
        "# Written by generate_effectiveness.py: matrix exponential of the row equations at 60 digits.",
        'source = "row equations of Pignotti and Cordero, J. Heat Transfer 105 (1983) 584-591, at 60 digits"',
        "from_memory = false",
        "relative_tolerance = 1e-13",
        'why = "rounding of a few dozen products in double precision"',
        "",
    ]
    for case in CASES:
        ntu, c, rows_per_pass, counter, connection, alternate, row_shares = case
        p = effectiveness(case)
        lines += ["[[case]]", f"ntu = {float(ntu)!r}", f"capacity_ratio = {float(c)!r}"]
        lines += [f"rows_per_pass = {list(rows_per_pass)}", f"counter = {str(counter).lower()}"]
        lines += [f'connection = "{connection}"', f"alternate = {str(alternate).lower()}"]
        if row_shares is not None:
            lines.append(f"row_shares = [{', '.join(row_shares)}]")
        lines += [f"expected = {mp.nstr(p, 17, min_fixed=-1, max_fixed=1)}", ""]
    Path(__file__).with_name("effectiveness.toml").write_text("\n".join(lines), encoding="utf-8")


if __name__ == "__main__":
    main()
