"""Figures as plain shapes with a paper scale, their plain data, their SVG and DXF."""

from __future__ import annotations

from lineproof.drawing.dxf import dxf
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
    "dxf",
    "from_json",
    "svg",
    "symbol",
    "to_json",
    "words",
]
