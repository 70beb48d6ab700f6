"""Drawings of a record as SVG, with the package's text safety."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any

from lineproof.drawing import from_json, svg
from lineproof.package.environment import Verbatim
from lineproof.typeset.glyphs import printable_tree


def drawing(figure: Mapping[str, Any]) -> Verbatim:
    """Return a drawing's SVG; characters without a glyph stand by their code."""
    return Verbatim(svg(from_json(printable_tree(figure))))


def paper_width(figure: Mapping[str, Any]) -> str:
    """Return the drawing's width on paper, in mm, as text."""
    return f"{float(figure['width']):g}"
