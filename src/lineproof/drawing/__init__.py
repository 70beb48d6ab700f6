"""Figures as plain shapes with a paper scale, their plain data and their SVG."""

from __future__ import annotations

from lineproof.drawing.interchange import from_json, to_json
from lineproof.drawing.shapes import (
    LIGHT,
    MEDIUM,
    OUTLINE,
    TEXT_SIZE,
    THIN,
    Arc,
    Arrow,
    Circle,
    Dash,
    Dimension,
    Figure,
    Line,
    Point,
    Polyline,
    Runs,
    Shape,
    Text,
    symbol,
    words,
)
from lineproof.drawing.svg import svg

__all__ = [
    "LIGHT",
    "MEDIUM",
    "OUTLINE",
    "TEXT_SIZE",
    "THIN",
    "Arc",
    "Arrow",
    "Circle",
    "Dash",
    "Dimension",
    "Figure",
    "Line",
    "Point",
    "Polyline",
    "Runs",
    "Shape",
    "Text",
    "from_json",
    "svg",
    "symbol",
    "to_json",
    "words",
]
