"""Curves: resistance against amount of steel, and stress against strain of concrete."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from itertools import pairwise

from lineproof.drawing import (
    TEXT_SIZE,
    THIN,
    Circle,
    Dash,
    Figure,
    Line,
    Point,
    Runs,
    Shape,
    Text,
    symbol,
)
from lineproof.drawing.axes import Axes, curve, drop_lines, frame, level, nice_ticks, spread
from lineproof.drawing.metrics import text_width

PAGE_WIDTH = 165.0
MARKS = (0.25, 0.5, 0.75, 1.0)


@dataclass(frozen=True, slots=True)
class MomentLevel:
    """A moment in kN.m drawn as a level: its printed label, its name in words, its dashes."""

    moment: float
    label: Runs
    name: str
    dash: Dash


def capacity_figure(
    points: Sequence[Point],
    chosen: Point,
    chosen_label: Runs,
    levels: Sequence[MomentLevel],
    *,
    caption: str = "Resistance against amount of steel",
) -> Figure:
    """Draw M_r in kN.m against A_s over its balanced value.

    ``points`` are pairs (ratio, moment) in rising order of ratio; ``chosen`` lies on the curve;
    ``levels`` are moments drawn as horizontal lines.
    The marks at a quarter, a half, three quarters and the whole of the balanced steel are drawn
    where the curve reaches them.
    """
    labels = (*(each.label for each in levels), _RESISTANCE)
    moments = [each.moment for each in levels]
    axes, x_ticks, y_ticks = _axes([*points, chosen], moments, labels)
    shapes = [
        *frame(axes, x_ticks, y_ticks, _X_LABEL, _Y_LABEL),
        curve(axes, points),
        *(level(axes, each.moment, each.dash) for each in levels),
        *_marks(axes, points),
        *drop_lines(axes, chosen),
        *_chosen(axes, points, moments, chosen, chosen_label),
        *_names(axes, (*moments, points[-1][1]), labels),
    ]
    text = (
        f"Curve of factored resistance against steel; {_plain(chosen_label)} gives "
        f"{chosen[1]:.0f} kN·m at {chosen[0]:.3f} of the balanced steel"
        + "".join(f"; {each.name} {each.moment:.0f} kN·m" for each in levels)
        + "."
    )
    return Figure(PAGE_WIDTH, 72.0, 1.0, (0.0, 0.0), tuple(shapes), text, caption)


_RESISTANCE = symbol("M", "r")
_X_LABEL: Runs = (*symbol("A", "s"), (" / ", "roman"), *symbol("A", "s,b"))
_Y_LABEL: Runs = (*symbol("M", "r"), (", kN·m", "roman"))


def _axes(
    points: Sequence[Point], levels: Sequence[float], labels: Sequence[Runs]
) -> tuple[Axes, Sequence[float], Sequence[float]]:
    """Choose ranges that hold all values, and leave room at the right for the names."""
    y_ticks = nice_ticks(0.0, 1.04 * max(*levels, *(y for _, y in points)))
    last = max(1.0, *(x for x, _ in points))
    x_ticks = nice_ticks(0.0, last, 4) if last > 1.0 else (0.0, *MARKS)
    room = max(text_width(label, TEXT_SIZE) for label in labels)
    width = PAGE_WIDTH - 16.0 - room - 6.0
    axes = Axes(16.0, 12.0, width, 56.0, (0.0, x_ticks[-1]), (0.0, y_ticks[-1]))
    return axes, x_ticks, y_ticks


def _names(axes: Axes, levels: Sequence[float], labels: Sequence[Runs]) -> list[Text]:
    """Name each line at its right end, moved apart where they come close."""
    ends = [axes.at(0.0, y)[1] for y in levels]
    places = spread(ends, 4.2, axes.bottom + 1.5, axes.bottom + axes.height)
    right = axes.left + axes.width + 2.0
    return [
        Text((right, y), label, "curve", anchor="start")
        for label, y in zip(labels, places, strict=True)
    ]


def _plain(runs: Runs) -> str:
    return "".join(text for text, _ in runs)


def _interpolate(points: Sequence[Point], x: float) -> float | None:
    for (x0, y0), (x1, y1) in pairwise(points):
        if x0 <= x <= x1 and x1 > x0:
            return y0 + (y1 - y0) * (x - x0) / (x1 - x0)
    return None


def _marks(axes: Axes, points: Sequence[Point]) -> list[Shape]:
    shapes: list[Shape] = []
    for ratio in MARKS:
        moment = _interpolate(points, ratio)
        if moment is not None:
            shapes.append(Circle(axes.at(ratio, moment), 0.7, "curve", weight=0.25, fill="white"))
    return shapes


def _chosen(
    axes: Axes, points: Sequence[Point], levels: Sequence[float], chosen: Point, runs: Runs
) -> list[Shape]:
    """Place the label of the chosen steel where it hides neither curve nor level."""
    x, y = axes.at(*chosen)
    width = text_width(runs, TEXT_SIZE)
    lines = [axes.at(0.0, value)[1] for value in levels]
    path = [axes.at(*point) for point in points]
    fields = [_field(x, y, width, dx, dy) for dx, dy in _PLACES]
    inside = [field for field in fields if _inside(field, axes)]
    free = [field for field in inside if _free(field, lines, path)]
    left, low, right, high = (free or inside or fields)[0]
    middle = (low + high) / 2
    near = (left + 0.4 if left > x else right - 0.4, middle)
    at = ((left + right) / 2, middle)
    return [Line((x, y), near, "text", THIN), Text(at, runs, "text", backing=True)]


_Field = tuple[float, float, float, float]
_PLACES = tuple(
    (side * dx, dy)
    for dx in (4.0, 9.0, 16.0, 26.0)
    for dy in (-4.0, -8.0, -12.0, 4.0, 9.0, -18.0, 14.0, -24.0, 20.0)
    for side in (1.0, -1.0)
)


def _field(x: float, y: float, width: float, dx: float, dy: float) -> _Field:
    """Left, bottom, right, top of a label that starts or ends ``dx`` from a point, mm."""
    left = x + dx if dx > 0 else x + dx - width
    return (left - 1.0, y + dy - 2.0, left + width + 1.0, y + dy + 2.0)


def _inside(field: _Field, axes: Axes) -> bool:
    left, low, right, high = field
    return (
        axes.left + 1.0 <= left
        and right <= axes.left + axes.width
        and axes.bottom <= low
        and high <= axes.bottom + axes.height
    )


def _free(field: _Field, lines: Sequence[float], path: Sequence[Point]) -> bool:
    """Tell whether a label crosses neither the levels nor the curve."""
    left, low, right, high = field
    if any(low <= y <= high for y in lines):
        return False
    steps = 40
    for number in range(steps + 1):
        at = _interpolate(path, left + (right - left) * number / steps)
        if at is not None and low <= at <= high:
            return False
    return True


def stress_strain_figure(
    points: Sequence[Point],
    *,
    peak: Point,
    peak_label: Runs,
    caption: str = "Concrete in compression",
) -> Figure:
    """Draw concrete stress in MPa against strain in thousandths, with its peak marked."""
    x_ticks = nice_ticks(0.0, points[-1][0], 4)
    y_ticks = nice_ticks(0.0, 1.1 * max(y for _, y in points), 4)
    axes = Axes(16.0, 12.0, 70.0, 38.0, (0.0, x_ticks[-1]), (0.0, y_ticks[-1]))
    y_label: Runs = (*symbol("f", "c"), (", MPa", "roman"))
    x_label: Runs = (*symbol("ε", "c"), (", thousandths", "roman"))
    x, y = axes.at(*peak)
    shapes = [
        *frame(axes, x_ticks, y_ticks, x_label, y_label),
        curve(axes, points),
        *drop_lines(axes, peak),
        Text((x, y + 3.4), peak_label, "text"),
    ]
    text = f"Stress rises to {peak[1]:.1f} MPa at a strain of {peak[0]:g} thousandths."
    return Figure(92.0, 54.0, 1.0, (0.0, 0.0), tuple(shapes), text, caption)
