"""Texts of a figure as DXF writes them: plain, with nothing in them that steers the reader."""

from __future__ import annotations

from lineproof.drawing.shapes import Dimension, Runs

MEASURED = "<>"
"""Stands in a dimension for the length measured in the drawing."""
_ESCAPED = {"\\": "\\\\", "{": "\\{", "}": "\\}", "^": "^ "}
_BREAK = "{}"
"""An empty group: it prints nothing and parts characters that would be read together."""


def plain_text(runs: Runs) -> str:
    """Return a line of text without styles; marks below the line follow an underscore.

    >>> plain_text((("f\u2009", "italic"), ("′", "roman"), ("c", "sub"), (" = 32", "roman")))
    "f'_c = 32"
    """
    text = ""
    for run, style in runs:
        mark = {"sub": "_", "sup": "^"}.get(style, "") if run.strip() else ""
        text += mark + run
    for space in ("\u2009", "\u202f"):
        text = text.replace(f"{space}′", "′").replace(space, " ")
    return text.replace("′", "'")


def escaped(text: str) -> str:
    r"""Return a text that prints literally in a DXF paragraph.

    >>> print(escaped(r"%%d {\P}"))
    %{}%d \{\\P\}
    """
    made = "".join(_ESCAPED.get(letter, letter) for letter in text)
    return made.replace("%%", f"%{_BREAK}%").replace("%%", f"%{_BREAK}%")


def mtext(runs: Runs) -> str:
    """Return a line of text as the content of a DXF paragraph."""
    return escaped(plain_text(runs))


def dimension_text(shape: Dimension) -> str:
    """Return the text of a dimension; where it is the length, the drawing measures it."""
    text = plain_text(shape.runs)
    if shape.value:
        return _unmeasured(escaped(text))
    measured = f"{shape.measured:.0f}"
    return _unmeasured(escaped(text.removesuffix(measured))) + MEASURED


def _unmeasured(text: str) -> str:
    return text.replace(MEASURED, f"<{_BREAK}>")
