"""Writing tables as CSV that a spreadsheet shows as they stand."""

from __future__ import annotations

import codecs
import csv
import io
import re
from collections.abc import Iterable

STARTS_A_FORMULA = ("=", "+", "-", "@", "\t", "\r", "\n", "＝", "＋", "－", "＠")
"""With one of these a spreadsheet takes a cell for a formula."""
_NUMBER = re.compile(r"[+-]?(\d+\.?\d*|\.\d+)([eE][+-]?\d{1,3})?", re.ASCII)


def is_number(text: str) -> bool:
    """Tell whether a spreadsheet reads a cell as a number."""
    return _NUMBER.fullmatch(text) is not None


def safe_cell(text: str) -> str:
    """Return a cell that a spreadsheet reads as a number or as text, never as a formula.

    >>> safe_cell("=1+1"), safe_cell("-12.5"), safe_cell("-x")
    ("'=1+1", '-12.5', "'-x")
    """
    if is_number(text):
        return text
    return f"'{text}" if text.lstrip(" ").startswith(STARTS_A_FORMULA) else text


def csv_bytes(rows: Iterable[Iterable[str]]) -> bytes:
    """Return rows as CSV by RFC 4180, in UTF-8.

    It begins with the mark of UTF-8, without which spreadsheets read "Ø" and "²" in the code page
    of the machine.
    """
    stream = io.StringIO(newline="")
    csv.writer(stream, lineterminator="\r\n").writerows(rows)
    return codecs.BOM_UTF8 + stream.getvalue().encode()
