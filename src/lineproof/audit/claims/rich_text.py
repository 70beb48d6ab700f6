"""Cells of a workbook whose formats by letter change what their digits say: raised, struck out."""

from __future__ import annotations

import html
import re
from collections.abc import Iterator

from lineproof.quantity import echo

_CELL = re.compile(rb"<(?:\w{1,20}:)?(?:si|is)>(.*?)</(?:\w{1,20}:)?(?:si|is)>", re.DOTALL)
_RUN = re.compile(
    rb"<(?:\w{1,20}:)?r>(.*?)<(?:\w{1,20}:)?t(?:\s[^>]{0,80})?>([^<]*)</(?:\w{1,20}:)?t>", re.DOTALL
)
_STRUCK = re.compile(rb"<(?:\w{1,20}:)?d?strike(?:\s*/>|\s+val=[\"'](?:1|true)[\"'])")
_RAISED = re.compile(rb"vertAlign\s+val=[\"']superscript[\"']")
_TEN = re.compile(r"(?<![\d.])10\Z")
_POWER = re.compile(r"[+-]?\d{1,2}\Z", re.ASCII)
_MOST = 10


def rich_text_faults(member: bytes, name: str) -> list[str]:
    """Return what cannot be read as plain text in a file of a workbook, by the texts of cells.

    A raised 3 behind 10 would read as 103, and digits that are struck out as digits.
    """
    found: list[str] = []
    for cell in _CELL.finditer(member):
        if b"strike" in cell[1] or b"superscript" in cell[1]:
            found += [f"{name}: {fault}" for fault in _faults(cell[1])]
        if len(found) >= _MOST:
            break
    return found[:_MOST]


def _faults(cell: bytes) -> Iterator[str]:
    runs = [
        (run[1], html.unescape(run[2].decode("utf-8", "replace"))) for run in _RUN.finditer(cell)
    ]
    whole = "".join(text for _, text in runs)
    before = ""
    for form, text in runs:
        if _STRUCK.search(form) and text.strip():
            yield f"{echo(whole)}: {echo(text)} in it is struck out; write what is meant alone"
        if _RAISED.search(form) and _TEN.search(before) and _POWER.match(text.strip()):
            yield (
                f"{echo(whole)}: {echo(text)} in it is raised, a power of ten; write it such as "
                f"'1e{text.strip()}'"
            )
        before += text
