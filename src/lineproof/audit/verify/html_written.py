"""Whether a page is written so that every reader takes it alike.

A browser and the standard library's reader part at the edges: ``</script x>`` ends a script for the
one and not for the other, ``-- >`` a comment the other way round, ``<div/>`` stays open in a
browser. No printer and no browser that saves a page writes these.
"""

from __future__ import annotations

import re

_SPACE = r"[ \t\n\r\f]"
_NAME = r"""[^\s<>/"'=]"""
_START = re.compile(
    rf"<[a-z]{_NAME}*(?:{_SPACE}+{_NAME}+(?:=(?:\"[^\"]*\"|'[^']*'|[^\s<>/\"'=`]+))?)*{_SPACE}*/?>",
    re.IGNORECASE,
)
_OTHER_NAMES = frozenset({"svg", "math"})
"""Elements in which ``<line/>`` is closed by its slash."""
_RAW_END = re.compile(r"</\s*(?:script|style)", re.IGNORECASE)


class Written:
    """The text of a page, asked for what stands at the place of a tag or comment."""

    def __init__(self, text: str) -> None:
        self.text = text
        self.lines = [0, *(found.end() for found in re.finditer("\n", text))]

    def _at(self, place: tuple[int, int]) -> int:
        line, column = place
        return self.lines[line - 1] + column

    def odd_start(self, said: str, *, closed: bool, among: tuple[str, ...] = ()) -> bool:
        """Tell whether a tag is written oddly; ``closed`` by its slash, inside which elements."""
        stays_open = closed and not _OTHER_NAMES.intersection(among)
        return stays_open or _START.fullmatch(said) is None

    def odd_end(self, tag: str, place: tuple[int, int]) -> bool:
        """Tell whether the end of an element is written oddly."""
        end = rf"</{re.escape(tag)}{_SPACE}*>"
        return re.compile(end, re.IGNORECASE).match(self.text, self._at(place)) is None

    def odd_comment(self, data: str, place: tuple[int, int]) -> bool:
        """Tell whether a comment ends elsewhere for a browser."""
        early = data.startswith((">", "->")) or "--!>" in data
        return early or not self.text.startswith(f"<!--{data}-->", self._at(place))


def odd_raw(data: str) -> bool:
    """Tell whether a script or style sheet ends elsewhere for a browser, or never."""
    return "<!--" in data or _RAW_END.search(data) is not None
