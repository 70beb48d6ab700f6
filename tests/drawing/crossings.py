"""Find texts that collide, for tests of figures."""

from __future__ import annotations

from itertools import combinations, pairwise

from lineproof.drawing import Arc, Circle, Figure, Line, Point, Polyline
from lineproof.drawing.paper import PaperShape, Placed, lower

Box = tuple[float, float, float, float]


def box_of(text: Placed, margin: float = 0.0) -> Box:
    """Return left, bottom, right, top of a printed text, mm on paper."""
    xs = [x for x, _ in text.corners]
    ys = [y for _, y in text.corners]
    return min(xs) - margin, min(ys) - margin, max(xs) + margin, max(ys) + margin


def words_of(text: Placed) -> str:
    """Return the plain words of a text."""
    return "".join(run for run, _ in text.text.runs)


def texts_on_texts(figure: Figure, margin: float = 0.2) -> list[tuple[str, str]]:
    """Pairs of texts that touch."""
    _, texts = lower(figure)
    return [
        (words_of(one), words_of(two))
        for one, two in combinations(texts, 2)
        if _touch(box_of(one, margin), box_of(two, margin))
    ]


def texts_on_lines(figure: Figure, layers: frozenset[str]) -> list[tuple[str, str]]:
    """Texts crossed by a stroke of the given layers, with the layer."""
    drawn, texts = lower(figure)
    found = []
    for text in texts:
        box = box_of(text)
        for shape in drawn:
            if shape.layer in layers and any(_crosses(box, a, b) for a, b in _segments(shape)):
                found.append((words_of(text), shape.layer))
                break
    return found


def _touch(one: Box, two: Box) -> bool:
    return one[0] < two[2] and two[0] < one[2] and one[1] < two[3] and two[1] < one[3]


def _segments(shape: PaperShape) -> list[tuple[Point, Point]]:
    match shape:
        case Line():
            return [(shape.start, shape.end)]
        case Polyline():
            ring = (*shape.points, shape.points[0]) if shape.closed else shape.points
            return list(pairwise(ring))
        case Circle() | Arc():
            (x, y), radius = shape.centre, shape.radius
            return [((x - radius, y), (x + radius, y)), ((x, y - radius), (x, y + radius))]


def _crosses(box: Box, start: Point, end: Point) -> bool:
    """Clip the segment to the box; something left means it crosses (Liang and Barsky 1984)."""
    low, high = 0.0, 1.0
    for axis in (0, 1):
        way = end[axis] - start[axis]
        for edge, sign in ((box[axis], -1.0), (box[axis + 2], 1.0)):
            room = sign * (edge - start[axis])
            step = sign * way
            if step == 0.0:
                if room < 0.0:
                    return False
            elif step > 0.0:
                high = min(high, room / step)
            else:
                low = max(low, room / step)
    return low < high
