"""Whether a figure can be printed and read: shapely finds what overlaps."""

from __future__ import annotations

from itertools import combinations, product

from shapely import LineString, Point, Polygon
from tests.drawing.extent import extent

from lineproof.drawing import (
    Arc,
    Circle,
    Dimension,
    Figure,
    Line,
    Polyline,
    Text,
    from_json,
    to_json,
)
from lineproof.drawing.paper import PaperShape, Placed, lower

LEAST_TEXT = 2.2
"""mm on paper."""
TALLEST = 235.0
WIDEST = 174.0


def plain(shape: Text | Dimension) -> str:
    """Return the words of a text or dimension."""
    return "".join(text for text, _ in shape.runs)


def words_of(figure: Figure) -> list[str]:
    """Return the words of all texts and dimensions."""
    return [plain(shape) for shape in figure.shapes if isinstance(shape, (Text, Dimension))]


def area_of(text: Placed) -> Polygon:
    """Return the field of a text on paper."""
    return Polygon(text.corners)


def stroke_of(shape: PaperShape) -> LineString:
    """Return the centre line of what is drawn."""
    match shape:
        case Line():
            return LineString([shape.start, shape.end])
        case Polyline():
            points = [*shape.points, shape.points[0]] if shape.closed else list(shape.points)
            return LineString(points)
        case Circle() | Arc():
            return Point(shape.centre).buffer(shape.radius).exterior


def colliding(figure: Figure, layers: frozenset[str]) -> list[tuple[str, str]]:
    """Return pairs of texts that touch, and texts crossed by a line of the layers."""
    drawn, texts = lower(figure)
    fields = [(plain(text.text), area_of(text)) for text in texts]
    found = [
        (one, two) for (one, a), (two, b) in combinations(fields, 2) if a.buffer(0.15).intersects(b)
    ]
    strokes = [(shape.layer, stroke_of(shape)) for shape in drawn if shape.layer in layers]
    found += [
        (name, layer)
        for (name, field), (layer, stroke) in product(fields, strokes)
        if field.intersects(stroke)
    ]
    return found


def assert_readable(figure: Figure, layers: frozenset[str] = frozenset()) -> None:
    """Everything on the paper, the paper on a page, texts large enough, nothing on a text."""
    left, bottom, right, top = extent(figure)
    sizes = [s.size for s in figure.shapes if isinstance(s, (Text, Dimension))]

    assert left >= 0.0
    assert bottom >= 0.0
    assert right <= figure.width <= WIDEST
    assert top <= figure.height <= TALLEST
    assert min(sizes) >= LEAST_TEXT
    assert colliding(figure, layers) == []
    assert to_json(from_json(to_json(figure))) == to_json(figure)
    assert figure.caption
    assert len(figure.alt) > len(figure.caption)
