"""Size of printed text, and what to print for a character the font does not have."""

from __future__ import annotations

from lineproof.drawing.font_widths import ITALIC_WIDTHS, ROMAN_WIDTHS
from lineproof.drawing.shapes import Runs

PAGE_WIDTH = 174.0
"""Width of a figure across an upright page of A4 [mm on paper]."""
SUB_SIZE = 0.68
SUB_DROP = 0.17
SUP_RISE = 0.36
CAP_HEIGHT = 0.66
DESCENT = 0.23
_DEEP = frozenset("gjpqyQ,;()[]{}|/_$çµβγζημξρςφχψĄąĢģĮįĶķĻļŅņŖŗŞşŢţŲų„‚")


def _by_character(table: dict[int, str]) -> dict[str, int]:
    return {character: width for width, characters in table.items() for character in characters}


_ROMAN = _by_character(ROMAN_WIDTHS)
_ITALIC = _by_character(ITALIC_WIDTHS)


def printable(text: str) -> str:
    """Return ``text`` with every character the font lacks written as its code point.

    >>> printable("h 🏠")
    'h <U+1F3E0>'
    """
    return "".join(
        character if character in _ROMAN and character in _ITALIC else f"<U+{ord(character):04X}>"
        for character in text
    )


def text_width(runs: Runs, size: float) -> float:
    """Width of one line of text in mm, for a text size in mm (kerning neglected)."""
    total = 0.0
    for text, style in runs:
        table = _ITALIC if style == "italic" else _ROMAN
        factor = {"sub": SUB_SIZE, "sup": SUB_SIZE, "bold": 1.08}.get(style, 1.0)
        total += factor * sum(table[character] for character in printable(text))
    return total * size / 1000.0


def depth_below_baseline(runs: Runs, size: float) -> float:
    """How far the text reaches below its baseline, in mm."""
    if any(style == "sub" or _DEEP & set(text) for text, style in runs):
        return DESCENT * size
    return 0.03 * size
