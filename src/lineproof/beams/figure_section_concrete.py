"""The concrete of a section to scale: how much of its flange is drawn, and its outline [mm]."""

from __future__ import annotations

from dataclasses import dataclass

from lineproof.beams.section_shape import SectionShape
from lineproof.drawing import LIGHT, Line, Point, Polyline, Shape

SCALES = (5.0, 7.5, 10.0, 12.5, 15.0, 20.0, 25.0, 30.0, 40.0, 50.0, 75.0, 100.0)
"""Usual scales, 1 to so many."""
TALLEST_SECTION = 51.0
"""Height of a section on paper at most [mm]."""
SMALLEST_WITH_WHOLE_FLANGE = 15.0
"""Scale up to which a flange is drawn whole."""
LOWEST_WITH_WHOLE_FLANGE = 36.0
"""Height on paper from which a section is high enough for that [mm]."""
BREAK_PAST = 2.0
"""How far a break line goes beyond the flange on paper [mm]."""
SHORTEST_STUB = 26.0
"""Part of a cut flange that is drawn beside the web at least, on paper [mm]."""


@dataclass(frozen=True, slots=True)
class Shown:
    """How much of the section is drawn: flange beyond the web each side, and the scale."""

    left: float
    right: float
    scale: float
    shortened: bool


def choose_scale(shape: SectionShape, room: float, tallest: float = TALLEST_SECTION) -> Shown:
    """Choose a usual scale for which the section fits ``room`` mm of paper in width.

    A flange too wide for a readable scale is cut by break lines near the web.
    """
    left, right = shape.overhangs
    width = shape.b_w + left + right
    readable = [
        ratio
        for ratio in SCALES
        if width == shape.b_w
        or (ratio <= SMALLEST_WITH_WHOLE_FLANGE and shape.h / ratio >= LOWEST_WITH_WHOLE_FLANGE)
    ]
    for ratio in readable:
        if shape.h / ratio <= tallest and width / ratio <= room:
            return Shown(left, right, 1.0 / ratio, shortened=False)
    ratio = next(
        (r for r in SCALES if shape.h / r <= tallest and 1.2 * shape.b_w / r <= room), SCALES[-1]
    )
    sides = (left > 0.0) + (right > 0.0)
    stub = min(
        max(0.9 * shape.b_w, SHORTEST_STUB * ratio), (room * ratio - shape.b_w) / max(sides, 1)
    )
    return Shown(min(left, stub), min(right, stub), 1.0 / ratio, shortened=sides > 0)


def outline(shape: SectionShape, shown: Shown, *, goes_on: bool = False) -> list[Shape]:
    """Draw the concrete: web from x = 0 to b_w, soffit at y = 0.

    Break lines end a flange that is shortened, or whose slab ``goes_on`` beyond what counts.
    """
    points = outline_points(shape, shown)
    slab = shown.left > 0.0 or shown.right > 0.0
    if not shown.shortened and not (goes_on and slab):
        return [Polyline(points, closed=True)]
    x0, x1 = -shown.left, shape.b_w + shown.right
    soffit = shape.h - shape.h_f
    shapes: list[Shape] = [Line((x0, shape.h), (x1, shape.h))]
    web = [(0.0, soffit), (0.0, 0.0), (shape.b_w, 0.0), (shape.b_w, soffit), (x1, soffit)]
    if shown.left:
        web.insert(0, (x0, soffit))
        shapes.append(_break_line(x0, soffit, shape.h, shown.scale))
    else:
        web[0] = (0.0, shape.h)
    shapes.append(Polyline(tuple(web)))
    shapes.append(_break_line(x1, soffit, shape.h, shown.scale))
    return shapes


def outline_points(shape: SectionShape, shown: Shown) -> tuple[Point, ...]:
    """Corners of the drawn concrete, anticlockwise from the lower left corner of the web."""
    b, h, soffit = shape.b_w, shape.h, shape.h - shape.h_f
    x0, x1 = -shown.left, b + shown.right
    right = ((b, soffit), (x1, soffit), (x1, h)) if shown.right else ((b, h),)
    left = ((x0, h), (x0, soffit), (0.0, soffit)) if shown.left else ((0.0, h),)
    return ((0.0, 0.0), (b, 0.0), *right, *left)


def _break_line(x: float, low: float, high: float, scale: float) -> Polyline:
    past, jog, step = BREAK_PAST / scale, 1.3 / scale, 0.9 / scale
    middle = (low + high) / 2
    points = (
        (x, low - past),
        (x, middle - step),
        (x - jog, middle - step / 3),
        (x + jog, middle + step / 3),
        (x, middle + step),
        (x, high + past),
    )
    return Polyline(points, weight=LIGHT)
