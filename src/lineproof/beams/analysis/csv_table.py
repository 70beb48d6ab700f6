"""Reading a CSV table from outside as plain text and numbers: nothing in it is ever computed.

A header names the columns with their units, ``M (kN.m)``; values are converted to N and mm. All
faults of a file are reported at once, with line and column.
"""

from __future__ import annotations

import csv
import re
from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from typing import Literal

from lineproof.errors import FileFaults, UserError
from lineproof.quantity import echo, internal_factor, unit_named
from lineproof.resources import csv_text

Cell = str | float
Kind = Literal["text", "number", "count"]

MOST_LINES = 200_000
LONGEST_LINE = 1_000
LONGEST_NAME = 80
_NUMBER = re.compile(r"[+-]?(\d+\.?\d*|\.\d+)([eE][+-]?\d{1,3})?", re.ASCII)
_COUNT = re.compile(r"\d{1,4}", re.ASCII)
_HEADER = re.compile(r"\s*(\w+)\s*(?:[(\[]([^()\[\]]{1,20})[)\]])?\s*", re.ASCII)
_NO_BREAK, _MINUS = "\u00a0", "\u2212"
"""The space that does not break, and the printed minus: both come with text copied from a page."""
_MISWRITTEN = (
    (
        re.compile(
            r"[+-]?\d{1,3}(,\d{3})+(\.\d*|,\d{3})|[+-]?\d{1,3}([ '\u00a0\u202f\u2019]\d{3})+\S*"
        ),
        "has marks between thousands; write its digits without, and a decimal point",
    ),
    (
        re.compile(r"[+-]?[1-9]\d{0,2},\d{3}"),
        "has a comma; write a point if it is a decimal one, nothing if it parts thousands",
    ),
    (re.compile(r"[+-]?[\d.]*,\d+"), "has a decimal comma; write a decimal point"),
)
"""Numbers as a spreadsheet may show them, and what to say of each."""
_FORMULA = ("=", "+", "-", "@", "\t", "\r")
"""What a spreadsheet would take for the start of a formula."""


@dataclass(frozen=True, slots=True)
class Column:
    """A column: name, kind of cell, an example unit for numbers, largest size in N and mm."""

    name: str
    kind: Kind
    unit: str = ""
    most: float = 0.0
    needed: bool = True


@dataclass(frozen=True, slots=True)
class Line:
    """One row read: line number in the file and the cells in the order of the columns."""

    number: int
    cells: tuple[Cell, ...]


def read_table(content: bytes, name: str, columns: Sequence[Column]) -> list[Line]:
    """Return the rows of a CSV file; a column left out that is not needed reads as zero.

    ``name`` stands for the file in messages. Raises :class:`UserError` with all faults.
    """
    faults = FileFaults(name)
    rows = _rows(csv_text(content, name), name)
    header = next(rows, None)
    if header is None:
        raise UserError(f"{name}: the file is empty; write {_sample(columns)} on its first line")
    places = _places(*header, columns, faults)
    faults.raise_if_any()
    made = []
    for number, cells in rows:
        if len(cells) != len(header[1]):
            cure = "; write decimal points, and names that hold commas in quotation marks"
            more = len(cells) > len(header[1])
            faults.add(
                f"line {number}: {len(cells)} cells under {len(header[1])} headings"
                f"{cure if more else ''}"
            )
            continue
        read = [_cell(cells, place, number, faults) for place in places]
        made.append(Line(number, tuple(read)))
    if not made and not faults.faults:
        faults.add("no rows under the headings")
    faults.raise_if_any()
    return made


def _rows(text: str, name: str) -> Iterator[tuple[int, list[str]]]:
    """Yield line number and cells of every line that is not empty; refuse what is no table."""
    lines = text.splitlines()
    if len(lines) > MOST_LINES:
        raise UserError(f"{name}: {len(lines)} lines, more than {MOST_LINES}; export fewer cases")
    long = next((n for n, line in enumerate(lines, start=1) if len(line) > LONGEST_LINE), None)
    if long is not None:
        raise UserError(f"{name}: line {long} is longer than {LONGEST_LINE} characters; no table")
    mark = ";" if lines and ";" in lines[0] else ","
    for number, line in enumerate(lines, start=1):
        try:
            cells = next(csv.reader([line], delimiter=mark, strict=True), [])
        except csv.Error:
            raise UserError(f"{name}: line {number}: a quotation mark is not closed") from None
        if any(cell.strip() for cell in cells):
            yield number, cells


def _sample(columns: Sequence[Column]) -> str:
    words = [f"{c.name} ({c.unit})" if c.unit else c.name for c in columns if c.needed]
    return repr(",".join(words))


@dataclass(frozen=True, slots=True)
class _Place:
    """Where a column stands in the file (None: left out), and its factor into N and mm."""

    column: Column
    at: int | None
    factor: float = 1.0


def _places(
    number: int, header: Sequence[str], columns: Sequence[Column], faults: FileFaults
) -> list[_Place]:
    found: dict[str, tuple[int, str]] = {}
    unknown: list[str] = []
    known = {column.name.lower(): column for column in columns}
    for at, cell in enumerate(header):
        match = _HEADER.fullmatch(cell[:LONGEST_NAME].replace(_NO_BREAK, " "))
        word = match[1].lower() if match else ""
        if word not in known:
            unknown.append(_unknown(cell, at, columns))
        elif word in found:
            faults.add(f"heading {echo(cell)} stands twice")
        elif match:
            found[word] = (at, match[2] or "")
    if not found:
        faults.add(
            f"line {number}: {echo(','.join(header))} are no headings; write {_sample(columns)} on "
            "the first line, with commas or semicolons between"
        )
        return []
    for fault in unknown:
        faults.add(f"line {number}: {fault}")
    places = []
    for column in columns:
        place = found.get(column.name.lower())
        if place is not None:
            places.append(_Place(column, place[0], _factor(column, place[1], faults)))
            continue
        places.append(_Place(column, None))
        if column.needed:
            faults.add(f"column {column.name!r} is missing; write {_sample(columns)}")
    return places


def _unknown(cell: str, at: int, columns: Sequence[Column]) -> str:
    if not cell.strip():
        return f"column {at + 1} has no heading; take it out"
    return f"heading {echo(cell)} is not known; take the column out, or write {_sample(columns)}"


def _factor(column: Column, unit: str, faults: FileFaults) -> float:
    if not column.unit:
        if unit:
            faults.add(f"heading {column.name!r} takes no unit, but has {echo(unit)}")
        return 1.0
    wanted = unit_named(column.unit)
    try:
        found = unit_named(unit) if unit else None
    except UserError as error:
        faults.add(f"heading {column.name!r}: {error.faults[0]}")
        return 1.0
    if found is None or found.kind != wanted.kind:
        what = "has no unit" if found is None else f"has {echo(unit)}, a unit of {found.kind}"
        faults.add(f"heading {column.name!r} {what}; write '{column.name} ({column.unit})'")
        return 1.0
    return internal_factor(found.spelling)


def _cell(cells: Sequence[str], place: _Place, number: int, faults: FileFaults) -> Cell:
    """Return one cell; where it is wrong, note the fault and return something harmless."""
    column = place.column
    if place.at is None:
        return "" if column.kind == "text" else 0.0
    cell = cells[place.at]
    where = f"line {number}, {column.name}"
    if column.kind == "text":
        return _name(cell, where, faults)
    text = cell.strip().replace(_MINUS, "-")
    if not (_COUNT if column.kind == "count" else _NUMBER).fullmatch(text):
        faults.add(f"{where}: {echo(cell)} {_what_is_wrong(text, column.kind)}")
        return 0.0
    value = float(text) * place.factor
    if column.most and not abs(value) <= column.most:
        faults.add(f"{where}: {echo(cell)} is beyond anything a beam carries; look at the unit")
        return 0.0
    return value


def _what_is_wrong(text: str, kind: Kind) -> str:
    if not text:
        return "is empty; write a number"
    if text.startswith("="):
        return "is a formula; save the values, not the formulas"
    if kind == "count":
        return "is not a whole number; write it like 2"
    return next(
        (words for pattern, words in _MISWRITTEN if pattern.fullmatch(text)),
        "is not a number; write it like -12.5",
    )


def _name(cell: str, where: str, faults: FileFaults) -> str:
    text = cell.strip()
    if cell.startswith(_FORMULA) or text.startswith(_FORMULA):
        faults.add(f"{where}: {echo(cell)} could run as a formula; begin the name with a letter")
    elif not text:
        faults.add(f"{where}: is empty; write a name")
    elif len(text) > LONGEST_NAME or not text.isprintable():
        faults.add(f"{where}: {echo(text)} is no name of up to {LONGEST_NAME} printed characters")
    else:
        return text
    return "?"
