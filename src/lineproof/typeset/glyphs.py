"""Characters that the package's fonts can print; all others are shown by their code."""

from __future__ import annotations

import re
import unicodedata
from functools import cache
from typing import Any

from lineproof.resources import folder

MISSING_NOTE = "Characters without a glyph in this package's fonts are shown by their code, <U+…>."


@cache
def _not_printable() -> re.Pattern[str]:
    text = (folder("templates") / "fonts" / "coverage.txt").read_text(encoding="ascii")
    ranges = []
    for span in text.split():
        first, _, last = span.partition("-")
        ranges.append(f"\\U{first:0>8}-\\U{last or first:0>8}")
    return re.compile(f"[^{''.join(ranges)}]")


def printable(text: str) -> str:
    r"""Return text with every character that has no glyph replaced by its code.

    Line ends and tabs become spaces; a letter with a separate accent becomes the joined letter.

    >>> printable("Hall \U0001f600"), printable("a\tb"), printable("Toe\u0301")
    ('Hall <U+1F600>', 'a b', 'Toé')
    """
    if text.isascii() and text.isprintable():
        return text
    tidy = " ".join(re.split(r"\r\n|[\t\n\r]", unicodedata.normalize("NFC", text)))
    return _not_printable().sub(lambda found: f"<U+{ord(found[0]):04X}>", tidy)


_BOUND = re.compile(
    r"(?<=\d) (?=(?:mm|m|kN|kPa|MPa|kg|h|%)(?![A-Za-z]))"  # 650 mm
    r"|(?:(?<=\bspan)|(?<=\bspans)|(?<=\bsupport)|(?<=\bsupports)|(?<=\bline)) (?=\d)"
    r"|(?<=\d) (?=FAILS$)"  # 1.24 FAILS
)


def bound(text: str) -> str:
    r"""Return a text whose numbers stay on the line of their unit, their place or their verdict.

    >>> bound("650 mm at support 2, 4 bars").replace("\u00a0", "~")
    '650~mm at support~2, 4 bars'
    """
    return _BOUND.sub("\u00a0", text)


def has_missing(text: str) -> bool:
    """Tell whether :func:`printable` shows a character of the text by its code."""
    if text.isascii() and text.isprintable():
        return False
    tidy = re.sub(r"[\t\n\r]", " ", unicodedata.normalize("NFC", text))
    return _not_printable().search(tidy) is not None


def printable_tree(data: Any) -> Any:
    """Apply :func:`printable` to every text inside plain JSON data (keys stay as they are)."""
    if isinstance(data, str):
        return printable(data)
    if isinstance(data, list):
        return [printable_tree(item) for item in data]
    if isinstance(data, dict):
        return {key: printable_tree(item) for key, item in data.items()}
    return data


def tree_has_missing(data: Any) -> bool:
    """Tell whether any text inside plain JSON data has a character without a glyph."""
    unusual: list[str] = []
    waiting: list[Any] = [[data]]
    while waiting:
        items = waiting.pop()
        for item in items.values() if isinstance(items, dict) else items:
            if isinstance(item, float):  # figures hold little else
                continue
            if isinstance(item, str):
                if not (item.isascii() and item.isprintable()):
                    unusual.append(item)
            elif isinstance(item, list | dict):
                waiting.append(item)
    # No accent joins a space, so that texts may be looked at side by side.
    return has_missing(" ".join(unusual))
