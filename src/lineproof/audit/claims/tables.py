"""Reading a table of claims, CSV or .xlsx, as text with row numbers; writing one that is safe.

Nothing of a table is ever computed: a cell that is a formula is refused, a workbook with macros
as well, and the sizes in a workbook's directory are looked at before anything is unpacked.
"""

from __future__ import annotations

import codecs
import csv
import io
import re
from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from pathlib import Path

from lineproof.audit.claims.workbooks import read_workbook, workbook_bytes
from lineproof.errors import FileFaults, UserError
from lineproof.package.csv_tables import STARTS_A_FORMULA, csv_bytes, safe_cell
from lineproof.quantity import echo
from lineproof.resources import csv_text, read_file

MOST_BYTES = 20_000_000
MOST_ROWS = 20_000
"""Rows of a table: more than ten times those of the longest record."""
MOST_COLUMNS = 60
LONGEST_CELL = 500
XLSX, CSV = ".xlsx", ".csv"
_MACROS = (".xlsm", ".xltm", ".xlam", ".xlsb")
_SEPARATOR = re.compile(r"sep=([,;\t])\r?\n", re.IGNORECASE)
_UTF_16 = (codecs.BOM_UTF16_LE, codecs.BOM_UTF16_BE)


@dataclass(frozen=True, slots=True)
class Row:
    """One row: its number as the spreadsheet shows it, and its cells by lower-case heading."""

    number: int
    cells: dict[str, str]


@dataclass(frozen=True, slots=True)
class Table:
    """A table read: the name that stands for it in messages, its headings, its rows."""

    name: str
    headings: tuple[str, ...]
    rows: tuple[Row, ...]


class TableFaults(FileFaults):
    """Faults of one table."""

    def at(self, row: int, column: str, fault: str) -> None:
        """Note a fault of one cell."""
        self.add(f"row {row}, {column}: {fault}")


def read_table(path: Path) -> Table:
    """Read a table by the ending of its file name; its first row holds the headings.

    Raises :class:`UserError` with every fault: formulas, merged cells, macros, a file that is too
    large or no table at all.
    """
    table, faults = read_with_faults(path)
    faults.raise_if_any()
    return table


def read_with_faults(path: Path) -> tuple[Table, TableFaults]:
    """Read a table and the faults of its cells, so that a reader can tell its own with them.

    Raises :class:`UserError` at once for what is no table.
    """
    name, ending = str(path), path.suffix.lower()
    if ending in _MACROS:
        raise UserError(f"{name}: a workbook that may hold macros; save it as .xlsx without them")
    if ending not in (CSV, XLSX):
        raise UserError(f"{name}: neither .csv nor .xlsx; save the table as one of them")
    content = read_file(path, MOST_BYTES, "keep the claims alone")
    if not content.strip():
        raise UserError(f"{name}: the file is empty; let 'lineproof audit --blank' write a table")
    raw = read_workbook(content, name) if ending == XLSX else _csv_rows(content, name)
    return _table(name, raw)


def _csv_rows(content: bytes, name: str) -> Iterator[list[str]]:
    text = _text(content, name)
    told = _SEPARATOR.match(text)  # a spreadsheet reads this line and shows no row of it
    text = text[told.end() :] if told else text
    mark = told[1] if told else _delimiter(text)
    reader = csv.reader(io.StringIO(text, newline=""), delimiter=mark, strict=True)
    try:
        yield from reader
    except csv.Error as error:
        raise UserError(
            f"{name}: row {reader.line_num}: no CSV ({error}); save it as 'CSV UTF-8'"
        ) from None


def _text(content: bytes, name: str) -> str:
    if content.startswith(_UTF_16):
        raise UserError(f"{name}: UTF-16 text; save it as 'CSV UTF-8'")
    if content.startswith(b"PK"):
        raise UserError(f"{name}: a workbook with the ending .csv; rename it to .xlsx")
    return csv_text(content, name)


def _delimiter(text: str) -> str:
    """Return the mark between the cells of the first row."""
    first = text.split("\n", maxsplit=1)[0]
    return max((",", ";", "\t"), key=first.count)


def _table(name: str, raw: Iterator[list[str]]) -> tuple[Table, TableFaults]:
    """Check the shape of the rows and put their cells under the headings."""
    faults = TableFaults(name)
    headings = _headings(next(raw, []), faults)
    rows = []
    for number, cells in enumerate(raw, start=2):
        if not any(cell.strip() for cell in cells):
            continue
        if number > MOST_ROWS + 1:
            most = f"{MOST_ROWS:,}".replace(",", " ")
            faults.add(f"more than {most} rows; keep one row for each claim")
            break
        rows.append(Row(number, _cells(number, cells, headings, faults)))
    return Table(name, headings, tuple(rows)), faults


def _headings(cells: Sequence[str], faults: TableFaults) -> tuple[str, ...]:
    made = [" ".join(cell.split()).lower() for cell in cells]
    while made and not made[-1]:
        made.pop()
    if not made:
        raise UserError(f"{faults.name}: row 1 holds no headings; write 'id,claimed,unit'")
    if len(made) > MOST_COLUMNS:
        raise UserError(f"{faults.name}: more than {MOST_COLUMNS} columns; keep the claims alone")
    for heading in dict.fromkeys(h for h in made if h and made.count(h) > 1):
        faults.add(f"row 1: heading {echo(heading)} stands twice; keep one")
    return tuple(made)


def _cells(
    number: int, cells: Sequence[str], headings: Sequence[str], faults: TableFaults
) -> dict[str, str]:
    found: dict[str, str] = {}
    for at, cell in enumerate(cells):
        text = cell.strip()
        if not text:
            continue
        column = (headings[at] if at < len(headings) else "") or f"column {at + 1}"
        if len(text) > LONGEST_CELL:
            faults.at(number, column, f"holds more than {LONGEST_CELL} characters; shorten it")
        elif text.startswith(("=", "＝", "@", "＠")):
            cure = _not_as_formula(text)
            faults.at(number, column, f"{echo(text)} {cure}")
        elif at >= len(headings):
            faults.at(number, column, f"{echo(text)} stands beyond the last heading; name it")
        else:
            found[column] = _without_apostrophe(text)
    return found


def _not_as_formula(text: str) -> str:
    """Say what is wrong with a cell that begins as a formula does: @200 may be a spacing."""
    spacing = text.lstrip("@＠ ")
    if spacing != text and spacing[:1].isdigit():
        return f"begins with @, as a formula may; write {spacing!r}"
    return "is a formula; write the value that it shows"


def _without_apostrophe(text: str) -> str:
    """Return a cell without the apostrophe that kept it from being a formula, or a number."""
    if not text.startswith("'"):
        return text
    held = text[1:].lstrip()
    return text[1:] if held.startswith(STARTS_A_FORMULA) or held[:1].isdigit() else text


def write_table(headings: Sequence[str], rows: Sequence[Sequence[str]], ending: str) -> bytes:
    """Return a table as CSV or .xlsx (by ``ending``) in which no cell starts a formula.

    The cells of a workbook keep what is typed in them as text: 0.50 stays 0.50.
    """
    safe = [[safe_cell(cell) for cell in row] for row in rows]
    if ending.lower() == XLSX:
        return workbook_bytes(headings, safe)
    if ending.lower() != CSV:
        raise UserError(f"{ending!r} is no ending of a table; write a name in .csv or .xlsx")
    return csv_bytes([map(safe_cell, headings), *safe])
