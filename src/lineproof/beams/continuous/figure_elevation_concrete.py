"""Concrete, supports and axes of an elevation. Heights are in mm on paper where they say so."""

from __future__ import annotations

from lineproof.beams.continuous.figure_elevation_view import View
from lineproof.beams.continuous.figure_support_names import SIZE as NAME
from lineproof.beams.continuous.figure_support_names import support_names
from lineproof.drawing import (
    LIGHT,
    MEDIUM,
    THIN,
    Line,
    Point,
    Polyline,
    Shape,
    Text,
)
from lineproof.drawing.metrics import PAGE_WIDTH

STUB = 4.5
"""Height of the column or wall drawn below the soffit, mm on paper."""
CONCRETE = 0.35
NAME_OVER = 2.0
"""Height of the names of supports over the axis lines, mm on paper."""


def concrete(view: View) -> list[Shape]:
    """Draw top, soffits, ends, supports and the underside of the slab."""
    outline = view.outline
    shapes: list[Shape] = [Line((view.low, 0.0), (view.high, 0.0), weight=CONCRETE)]
    count = len(outline.lengths)
    for span in range(max(view.first - 1, 1), min(view.last + 1, count) + 1):
        start, end = outline.faces(span)
        a, b = max(start, view.low), min(end, view.high)
        soffit = -outline.depths[span - 1]
        shapes.append(Line((a, soffit), (b, soffit), weight=CONCRETE))
        if outline.h_f > 0.0:
            shapes.append(Line((a, -outline.h_f), (b, -outline.h_f), weight=THIN, dash="dashed"))
    for support in view.supports:
        shapes.extend(_support(view, support))
    shapes.extend(_ends(view))
    return shapes


def _neighbours(view: View, support: int) -> tuple[float, float]:
    """Depths left and right of a support; beyond an end, the depth of its one span."""
    depths = view.outline.depths
    return depths[max(support - 2, 0)], depths[min(support - 1, len(depths) - 1)]


def _support(view: View, number: int) -> list[Shape]:
    outline = view.outline
    support = outline.supports[number - 1]
    axis = outline.axes[number - 1]
    left, right = axis - support.half, axis + support.half
    depths = _neighbours(view, number)
    if support.carrier == "none" or support.width == 0.0:
        return [] if support.kind == "free" else _knife_edge(view, axis, max(depths))
    foot = -view.deepest - view.mm(STUB - 1.0)
    if support.carrier == "girder":
        foot = -max(depths) - view.mm(1.2)
        corners = ((left, 0.0), (right, 0.0), (right, foot), (left, foot))
        return [
            Polyline(corners, weight=CONCRETE, closed=True),
            Line((left, 0.0), (right, foot), weight=THIN),
            Line((left, foot), (right, 0.0), weight=THIN),
        ]
    outer = (0.0 if number == 1 else -depths[0], 0.0 if number == len(outline.axes) else -depths[1])
    shapes: list[Shape] = [
        Line((left, outer[0]), (left, foot), weight=CONCRETE),
        Line((right, outer[1]), (right, foot), weight=CONCRETE),
    ]
    if support.carrier == "wall":
        soffit = -max(depths)
        corners = ((left, soffit), (right, soffit), (right, foot), (left, foot))
        return [Polyline(corners, weight=0.0, closed=True, fill="hatch"), *shapes]
    return [*shapes, _break_across(view, left, right, foot)]


def _knife_edge(view: View, axis: float, depth: float) -> list[Shape]:
    """Draw a support without width as a triangle."""
    half, height = view.mm(1.4), view.mm(2.4)
    corners = ((axis, -depth), (axis - half, -depth - height), (axis + half, -depth - height))
    return [Polyline(corners, weight=MEDIUM, closed=True)]


def _break_across(view: View, left: float, right: float, y: float) -> Polyline:
    past, jog = view.mm(0.6), view.mm(0.7)
    middle, step = (left + right) / 2, (right - left) / 8
    points = (
        (left - past, y),
        (middle - step, y),
        (middle - step / 3, y - jog),
        (middle + step / 3, y + jog),
        (middle + step, y),
        (right + past, y),
    )
    return Polyline(points, weight=LIGHT)


def _ends(view: View) -> list[Shape]:
    """Close the free ends; draw a break line where the beam goes on."""
    outline = view.outline
    shapes: list[Shape] = []
    for cut, x, span, support in (
        (view.cut_left, view.low, view.first - 1, 1),
        (view.cut_right, view.high, view.last + 1, len(outline.supports)),
    ):
        if cut:
            shapes.append(_break_down(view, x, outline.depths[span - 1]))
        elif outline.supports[support - 1].width == 0.0:
            depth = outline.depths[0 if support == 1 else -1]
            shapes.append(Line((x, 0.0), (x, -depth), weight=CONCRETE))
    return shapes


def _break_down(view: View, x: float, depth: float) -> Polyline:
    past, jog = view.mm(1.0), view.mm(0.7)
    points: tuple[Point, ...] = (
        (x, past),
        (x, -0.4 * depth),
        (x - jog, -0.47 * depth),
        (x + jog, -0.53 * depth),
        (x, -0.6 * depth),
        (x, -depth - past),
    )
    return Polyline(points, weight=LIGHT)


def axis_lines(view: View, ceiling: float, floor: float) -> list[Shape]:
    """Draw the axes of supports from ``floor`` to ``ceiling`` (paper) with their names."""
    axes, supports = view.outline.axes, view.outline.supports
    shapes: list[Shape] = [
        Line(
            (axes[number - 1], view.mm(floor)), (axes[number - 1], view.mm(ceiling)),
            "centre", THIN, "chain",
        )
        for number in view.supports
    ]  # fmt: skip
    held = [number for number in view.supports if supports[number - 1].kind != "free"]
    middles = [view.paper(axes[number - 1]) for number in held]
    return shapes + [
        Text(view.at(x, ceiling + NAME_OVER), name, "centre", NAME)
        for name, x in support_names(held, middles, 0.5, PAGE_WIDTH - 0.5)
    ]
