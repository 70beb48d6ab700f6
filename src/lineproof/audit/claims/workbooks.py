"""Workbooks (.xlsx) as rows of text: looked at as a zip first, then read without computing."""

from __future__ import annotations

import datetime as dt
import io
import re
import zipfile
import zlib
from collections.abc import Iterator, Sequence
from itertools import pairwise
from typing import TYPE_CHECKING

from lineproof.audit.claims.rich_text import rich_text_faults
from lineproof.audit.claims.shown import shown_number
from lineproof.errors import UserError
from lineproof.sentences import listed

if TYPE_CHECKING:
    from openpyxl.cell.cell import Cell
    from openpyxl.worksheet.worksheet import Worksheet

MOST_UNPACKED = 60_000_000
MOST_RATIO = 200
"""Times that a member may grow when unpacked; the XML of a plain table grows tenfold."""
SMALL_MEMBER = 1_000_000
"""A member up to this size may be packed as tightly as it likes."""
MOST_MEMBERS = 500
_COLUMNS_READ = 64
_ROWS_READ = 20_002
_SHARED_HEADINGS = 2
"""So many headings that two sheets share make the second a table like the first."""
_MOST_TOLD = 8
_OLD_FORMAT = b"\xd0\xcf\x11\xe0"
_MERGED = re.compile(rb"<(?:\w+:)?mergeCell\s[^>]{0,80}?ref=[\"']([A-Z0-9:$]{1,30})[\"']")
_ROW = re.compile(rb"<(?:\w{1,20}:)?row\s[^>]{0,400}?\br=[\"'](-?\d{1,20})[\"']")
_CELL = re.compile(rb"<(?:\w{1,20}:)?c\s[^>]{0,200}?\br=[\"']([A-Z]{1,3}\d{1,20})[\"']")
_VALUES = (b"<v>", b"<is>", b":v>", b":is>")
_SHEET = re.compile(r"xl/worksheets/[^/]+\.xml", re.IGNORECASE)
_ENCODING = re.compile(
    rb"[\xef\xbb\xbf\xfe\xff]{0,3}\s*<\?xml\s[^>]{0,200}?encoding\s*=\s*[\"']([^\"']{0,40})"
)
_ENCODINGS = (b"utf-8", b"utf8", b"utf-16", b"utf-16le", b"utf-16be", b"us-ascii", b"iso-8859-1")
_WIDTHS = {"id": 26, "label": 8, "place": 44, "symbol": 10, "title": 48, "claimed": 14, "where": 18}


def read_workbook(content: bytes, name: str) -> Iterator[list[str]]:
    """Give the rows of a workbook's first visible sheet as text, as the cells show them.

    A formula is given as its text, which begins with ``=``. Raises :class:`UserError` for macros,
    merged cells, cells struck out, a second sheet with such a table, and for an archive that
    unpacks into more than a table needs.
    """
    faults = _archive_faults(content, name)
    if faults:
        raise UserError(faults)
    from openpyxl import load_workbook  # noqa: PLC0415 - 0.2 s, for workbooks alone

    try:
        book = load_workbook(io.BytesIO(content), read_only=True, data_only=False)
        visible = [each for each in book.worksheets if each.sheet_state == "visible"]
        first, *others = visible or book.worksheets
        _refuse_second_table(first, others, name)
        yield from _rows(first.iter_rows(max_row=_ROWS_READ, max_col=_COLUMNS_READ), name)
    except UserError:
        raise
    except Exception:  # noqa: BLE001 - a broken workbook raises whatever its reader meets
        raise UserError(
            f"{name}: cannot be read as a workbook; open it in a spreadsheet and save it again"
        ) from None


def _archive_faults(content: bytes, name: str) -> list[str]:
    if content.startswith(_OLD_FORMAT):
        return [f"{name}: an old or locked workbook; save it as .xlsx without a password"]
    try:
        with zipfile.ZipFile(io.BytesIO(content)) as archive:
            members = archive.infolist()
            return _size_faults(members, name) or _content_faults(archive, members, name)
    except (
        zipfile.BadZipFile, zlib.error, RuntimeError, OSError, EOFError,
    ):  # fmt: skip
        return [f"{name}: not a workbook, or cut off; save the table as .xlsx again"]


def _size_faults(members: Sequence[zipfile.ZipInfo], name: str) -> list[str]:
    """Look at the sizes in the directory: nothing is unpacked that would not end."""
    if len(members) > MOST_MEMBERS:
        return [f"{name}: {len(members)} files inside; a table has some ten. Not opened"]
    total = sum(member.file_size for member in members)
    if total > MOST_UNPACKED:
        return [f"{name}: unpacks to {total / 1e6:.0f} MB; keep the claims alone. Not opened"]
    for member in members:
        grows = member.file_size / max(member.compress_size, 1)
        if member.file_size > SMALL_MEMBER and grows > MOST_RATIO:
            return [f"{name}: a file inside unpacks to {grows:.0f} times its size. Not opened"]
    return []


def _content_faults(
    archive: zipfile.ZipFile, members: Sequence[zipfile.ZipInfo], name: str
) -> list[str]:
    names = [member.filename for member in members]
    if not any(_SHEET.fullmatch(n) for n in names):
        return [f"{name}: a zip archive without a worksheet; save the table as .xlsx"]
    if any("vbaproject" in n.lower() or "macrosheets" in n.lower() for n in names):
        return [f"{name}: holds macros; save it as .xlsx without them"]
    faults = []
    for member in members:
        text = archive.read(member)  # whatever its name: the directory inside says what is read
        if _declares(text):
            return [f"{name}: holds declarations that no spreadsheet writes. Not opened"]
        if b"macroEnabled" in text:
            return [f"{name}: a workbook that may hold macros; save it as .xlsx without them"]
        if _SHEET.fullmatch(member.filename):
            faults += [
                f"{name}: cells {found.decode()} are merged; split them, one value in each cell"
                for found in _MERGED.findall(text)[:10]
            ]
            faults += rich_text_faults(text, name)
            if not _in_order(text):
                faults.append(
                    f"{name}: rows or cells stand twice or out of order, so that some would not be "
                    "read; open it in a spreadsheet and save it again"
                )
            if _filled_below(text):
                faults.append(
                    f"{name}: rows below {_ROWS_READ - 2} hold values, which are not read"
                )
        elif member.filename.lower().endswith("sharedstrings.xml"):
            faults += rich_text_faults(text, name)
    return faults


def _in_order(sheet: bytes) -> bool:
    """Tell whether each row stands behind the one before, and each cell once.

    The reader passes over what comes later than it should, and of two cells keeps one.
    """
    rows = [int(number) for number in _ROW.findall(sheet)]
    cells = _CELL.findall(sheet)
    ascending = all(first < second for first, second in pairwise([0, *rows]))
    return ascending and len(set(cells)) == len(cells)


def _filled_below(sheet: bytes) -> bool:
    """Tell whether rows that are not read hold values; empty ones may only carry a format."""
    below = next((row for row in _ROW.finditer(sheet) if int(row[1]) > _ROWS_READ), None)
    return below is not None and any(mark in sheet[below.end() :] for mark in _VALUES)


def _declares(text: bytes) -> bool:
    """Tell whether a file inside declares entities, or an encoding that could hide them."""
    plain = text.replace(b"\0", b"")  # UTF-16
    encoding = _ENCODING.match(plain)
    hides = encoding is not None and encoding[1].lower() not in _ENCODINGS
    return hides or b"<!DOCTYPE" in plain or b"<!ENTITY" in plain


def _refuse_second_table(first: Worksheet, others: Sequence[Worksheet], name: str) -> None:
    """Refuse a workbook in which claims stand on two sheets, of which one would be passed over."""
    headings = _first_row(first)
    for other in others:
        if len(headings & _first_row(other)) >= _SHARED_HEADINGS:
            raise UserError(
                f"{name}: sheets {first.title!r} and {other.title!r} both hold a table; put all "
                "rows into one, or hide the sheet that is not meant"
            )


def _first_row(sheet: Worksheet) -> set[str]:
    rows = sheet.iter_rows(max_row=1, max_col=_COLUMNS_READ, values_only=True)
    return {str(each).strip().lower() for each in next(rows, ()) if each is not None}


def _rows(rows: Iterator[tuple[Cell, ...]], name: str) -> Iterator[list[str]]:
    struck: list[str] = []
    for row in rows:
        yield [_shown(cell) for cell in row]
        struck += [
            cell.coordinate for cell in row
            if cell.value is not None and cell.has_style and cell.font.strike
        ]  # fmt: skip
    if struck:
        raise UserError(
            f"{name}: {listed(struck, _MOST_TOLD)} struck out; empty the cells that are not "
            "claimed, or take the line through them off"
        )


def _column(at: int) -> str:
    from openpyxl.utils import get_column_letter  # noqa: PLC0415 - with it

    return str(get_column_letter(at))


def _shown(cell: Cell) -> str:
    """Return a cell's text as the spreadsheet shows it: 0.5 under the format 0.00 is 0.50."""
    value = cell.value
    if value is None:
        return ""
    if cell.data_type == "f":  # an array formula is an object
        return value if isinstance(value, str) else "={...}"
    if isinstance(value, bool) or not isinstance(value, int | float):
        is_date = isinstance(value, dt.date | dt.time | dt.timedelta)
        return f"{value} (a date)" if is_date else str(value)
    return shown_number(value, str(cell.number_format or "General"))


def workbook_bytes(headings: Sequence[str], rows: Sequence[Sequence[str]]) -> bytes:
    """Return a workbook with one sheet in which every cell is text and keeps what is typed."""
    from openpyxl import Workbook  # noqa: PLC0415 - 0.2 s, for workbooks alone
    from openpyxl.styles import Font  # noqa: PLC0415 - with it

    book = Workbook()
    sheet = book.active
    if sheet is None:
        msg = "a new workbook has a sheet"
        raise TypeError(msg)
    sheet.title = "Claims"
    sheet.freeze_panes = "A2"
    for number, row in enumerate([headings, *rows], start=1):
        for at, text in enumerate(row, start=1):
            cell = sheet.cell(number, at)
            cell.value = text or None
            cell.number_format = "@"  # text as typed: 0.50 stays 0.50
            if number == 1:
                cell.font = Font(bold=True)
    for at, heading in enumerate(headings, start=1):
        sheet.column_dimensions[_column(at)].width = _WIDTHS.get(heading, 12)
    stream = io.BytesIO()
    book.save(stream)
    return stream.getvalue()
