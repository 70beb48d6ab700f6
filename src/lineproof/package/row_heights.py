"""Rows of tables that are surely one line high, so that the printer need not measure their cells.

A cell that is measured is laid out, and kept in memory, once more. Where a text might wrap, its row
is measured as ever.
"""

from __future__ import annotations

from collections.abc import Sequence

from lineproof.typeset.glyphs import printable
from lineproof.typeset.measure import width
from lineproof.typeset.nodes import Math
from lineproof.typeset.rows import PrintedTable

PAPER = 174.0
"""Width of the text on the narrower paper, mm."""
CLAUSE_COLUMN = 20.0
"""What a table of the working leaves free on its left, mm."""
ONE_LINE, MEASURED = "1", "0"
_NARROW_TABLE = 6
_TABLE_INSET = 3.5
_POINTS = 72 / 25.4
_SLACK = 1.25
"""The estimate of a formula may be short by a tenth."""
_WIDEST = {
    **dict.fromkeys(" ',.|!:;()/\\ijl{}²³´¹·°\u00a0\u202f", 0.35),
    **dict.fromkeys('"-IJ[]`ft*?rs', 0.45),
    **dict.fromkeys("_cez~#$+0123456789<>FS^abgv–−≤≥×±§", 0.55),
    **dict.fromkeys("%=EPLYZdhknopquxyµ", 0.65),
    **dict.fromkeys("&ABCDGKNOQRTUVX—αφ", 0.75),
    **dict.fromkeys("@HMWmw…", 1.05),
}
"""At most so wide is a letter, in em, regular or bold."""
_WIDEST_OF_ALL = 1.65


def widest(text: str) -> float:
    """Return a width, in em of its size, that a printed text surely does not exceed, bold or not.

    >>> round(widest("24 mm"), 2)
    3.55
    """
    return sum(_WIDEST.get(letter, _WIDEST_OF_ALL) for letter in printable(text))


def table_heights(table: PrintedTable, size: str, *, working: bool) -> str:
    """Return the heights of the rows of a printed table, as :func:`row_heights` does."""
    rows: list[Sequence[str | Math]] = [table.columns, *table.rows]
    columns = list(table.widths)
    if table.lines:
        labels = ["Line", *(label for _, label in table.lines)]
        rows = [(*row, label) for row, label in zip(rows, labels, strict=True)]
        columns.append("")
    beside_clauses = working and len(columns) <= _NARROW_TABLE
    room = PAPER - CLAUSE_COLUMN if beside_clauses else PAPER
    return row_heights(rows, columns, float(size), _TABLE_INSET, room)


def row_heights(
    rows: Sequence[Sequence[str | Math]],
    columns: Sequence[str],
    size: float,
    inset: float,
    room: float = PAPER,
) -> str:
    """Return for each row but the first "1" if it is surely one line high, "0" if not.

    The first row are the headings. ``columns`` are widths in mm as text, "" for as wide as the
    texts, "1fr" for what is left; ``size`` is that of the text and ``inset`` the space left and
    right of it, both in points; ``room`` is the width of the table in mm.
    """
    needed = [[_needed(cell) * size + 2 * inset for cell in row] for row in rows]
    rooms = _rooms(needed, columns, room * _POINTS)
    fits = (all(want <= has for want, has in zip(row, rooms, strict=True)) for row in needed[1:])
    return "".join(ONE_LINE if fit else MEASURED for fit in fits)


def _needed(cell: str | Math) -> float:
    return widest(cell) if isinstance(cell, str) else _SLACK * width(cell)


def _rooms(needed: Sequence[Sequence[float]], columns: Sequence[str], room: float) -> list[float]:
    """Return the width that each column has at least, in points."""
    fixed = [float(column) * _POINTS if column not in ("", "1fr") else 0.0 for column in columns]
    natural = [max(cells) for cells in zip(*needed, strict=True)]
    own = [want for want, column in zip(natural, columns, strict=True) if column == ""]
    left = room - sum(fixed)
    if sum(own) <= left:
        rooms = {"": float("inf"), "1fr": (left - sum(own)) / max(columns.count("1fr"), 1)}
    else:  # columns that want more than their share get no less than it
        rooms = {"": left / max(len(own), 1), "1fr": 0.0}
    return [rooms.get(column, width) for column, width in zip(columns, fixed, strict=True)]
