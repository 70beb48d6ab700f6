"""How far a figure reaches on its paper."""

from __future__ import annotations

from lineproof.drawing.paper import PaperShape, lower
from lineproof.drawing.shapes import Arc, Circle, Figure, Line, Point, Polyline


def extent(figure: Figure) -> tuple[float, float, float, float]:
    """Return left, bottom, right, top of all that is drawn, mm on paper, with line weights."""
    drawn, texts = lower(figure)
    xs: list[float] = []
    ys: list[float] = []
    for shape in drawn:
        points, margin = _reach(shape)
        xs.extend(x + side * margin for x, _ in points for side in (-1, 1))
        ys.extend(y + side * margin for _, y in points for side in (-1, 1))
    for text in texts:
        xs.extend(x for x, _ in text.corners)
        ys.extend(y for _, y in text.corners)
    if not xs:
        return (0.0, 0.0, 0.0, 0.0)
    return (min(xs), min(ys), max(xs), max(ys))


def _reach(shape: PaperShape) -> tuple[tuple[Point, ...], float]:
    match shape:
        case Line():
            return (shape.start, shape.end), shape.weight / 2
        case Polyline():
            return shape.points, shape.weight / 2
        case Circle() | Arc():
            x, y = shape.centre
            radius = shape.radius
            return ((x - radius, y - radius), (x + radius, y + radius)), shape.weight / 2
