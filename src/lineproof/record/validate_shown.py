"""The form of figures and tables of a record: where they are printed, which files they make."""

from __future__ import annotations

import re
from collections.abc import Mapping
from typing import Any

from lineproof.errors import UserError
from lineproof.record.entry import FIGURE, TABLE
from lineproof.record.plain_data import check_texts, is_number, need, shown

Data = Mapping[str, Any]

FILES = {FIGURE: "dxf", TABLE: "csv"}
"""The file that an entry of a kind may be issued as."""
LAST_FRONT = 9999
WIDEST = 174.0
_STEM = re.compile(r"[A-Za-z0-9][A-Za-z0-9_-]{0,59}\Z")


def check_placing(entry_id: str, entry: Data) -> None:
    """Check where a figure or table is printed and the name of its file."""
    front = entry.get("front", 0)
    if type(front) is not int or not 0 <= front <= LAST_FRONT:
        raise UserError(
            f"record: {entry_id}: front={shown(front)} is no place on the summary pages; "
            f"write a whole number from 0 to {LAST_FRONT}"
        )
    ending = FILES[entry["kind"]]
    stem = entry.get(ending)
    if stem is not None and not (isinstance(stem, str) and _STEM.match(stem)):
        raise UserError(
            f"record: {entry_id}: {ending}={shown(stem)} cannot name a file; use letters, digits "
            f"and hyphens, 60 at most, such as {'elevation' if ending == 'dxf' else 'schedule'!r}"
        )


def check_table(entry_id: str, entry: Data) -> None:
    """Check a table: texts, as many cells in each row as columns, widths and lines that fit."""
    need(entry, entry_id, columns=list, rows=list)
    check_texts(entry["columns"], entry_id)
    for row in entry["rows"]:
        check_texts(row, entry_id)
        if len(row) != len(entry["columns"]):
            raise UserError(f"record: {entry_id}: a row of the table has too few or many cells")
    check_placing(entry_id, entry)
    _check_widths(entry_id, entry)
    _check_lines(entry_id, entry)


def _check_widths(entry_id: str, entry: Data) -> None:
    widths = entry.get("widths")
    if widths is None:
        return
    fits = isinstance(widths, list) and len(widths) == len(entry["columns"])
    known = fits and all(is_number(width) and width >= 0 for width in widths)
    if not known or sum(widths) > WIDEST:
        raise UserError(
            f"record: {entry_id}: widths={str(widths)[:60]}; give one width a column, in mm on "
            f"paper, together {WIDEST:.0f} at most"
        )


def _check_lines(entry_id: str, entry: Data) -> None:
    lines = entry.get("lines")
    if lines is None:
        return
    check_texts(lines, entry_id)
    named = {"", *entry.get("args", {}).values()}
    if len(lines) != len(entry["rows"]) or not named.issuperset(lines):
        raise UserError(
            f"record: {entry_id}: its lines do not name one entry a row that it rests on"
        )
