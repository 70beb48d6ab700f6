"""Light hatch of a polygon as plain thin lines at 45 degrees."""

from __future__ import annotations

import math

from lineproof.drawing.shapes import Point

SPACING = 1.1
SHORTEST = 1e-6
_COS45 = math.sqrt(0.5)


def hatch_lines(points: tuple[Point, ...], spacing: float = SPACING) -> list[tuple[Point, Point]]:
    """Return the hatch lines inside a closed polygon, in the units of its points.

    The lines lie on one family for the whole sheet, so neighbouring polygons hatch alike.
    ``points`` holds at least one point; fewer than three enclose nothing and give no line.
    """
    turned = [((x + y) * _COS45, (y - x) * _COS45) for x, y in points]
    first = math.ceil(min(v for _, v in turned) / spacing)
    last = math.floor(max(v for _, v in turned) / spacing)
    lines: list[tuple[Point, Point]] = []
    for number in range(first, last + 1):
        level = number * spacing
        cuts = sorted(_crossings(turned, level))
        for start, end in zip(cuts[::2], cuts[1::2], strict=False):
            if end - start > SHORTEST:
                lines.append((_back(start, level), _back(end, level)))
    return lines


def _crossings(turned: list[Point], level: float) -> list[float]:
    """Return where a polygon's sides cross ``v = level`` (a side owns its lower end only)."""
    cuts = []
    for (u1, v1), (u2, v2) in zip(turned, [*turned[1:], turned[0]], strict=True):
        if (v1 <= level) != (v2 <= level):
            cuts.append(u1 + (level - v1) / (v2 - v1) * (u2 - u1))
    return cuts


def _back(u: float, v: float) -> Point:
    return ((u - v) * _COS45, (u + v) * _COS45)
