"""Axes of a curve as plain shapes, for figures drawn in mm on paper (scale 1)."""

from __future__ import annotations

import math
from collections.abc import Iterable, Sequence
from dataclasses import dataclass
from itertools import pairwise

from lineproof.drawing.shapes import (
    LIGHT,
    THIN,
    Circle,
    Dash,
    Line,
    Point,
    Polyline,
    Runs,
    Shape,
    Text,
    words,
)
from lineproof.quantity.digits import MINUS

TICK_TEXT = 2.6
TICK_LENGTH = 1.0
CURVE_WEIGHT = 0.45
LEVEL_WEIGHT = 0.3
MOST_DECIMALS = 9
GROUPED_FROM = 10_000
UNSEEN = 0.005
"""Distance on paper [mm] that no printer shows: a hundredth of the width of a curve."""
_CURVE_DECIMALS = 4


@dataclass(frozen=True, slots=True)
class Axes:
    """A field of paper (mm) that stands for a range of two quantities."""

    left: float
    bottom: float
    width: float
    height: float
    x_range: tuple[float, float]
    y_range: tuple[float, float]

    def at(self, x: float, y: float) -> Point:
        """Place of a value pair on paper, mm."""
        (x0, x1), (y0, y1) = self.x_range, self.y_range
        return (
            self.left + self.width * (x - x0) / (x1 - x0),
            self.bottom + self.height * (y - y0) / (y1 - y0),
        )


def nice_ticks(low: float, high: float, about: int = 5) -> tuple[float, ...]:
    """Return round numbers that cover ``low`` to ``high`` in steps of 1, 2, 2.5 or 5.

    >>> nice_ticks(0.0, 930.0)
    (0.0, 200.0, 400.0, 600.0, 800.0, 1000.0)
    """
    if not (math.isfinite(low) and math.isfinite(high) and low < high):
        msg = f"ticks need two finite numbers in rising order, not {low} and {high}"
        raise ValueError(msg)
    raw = (high - low) / about
    power = 10.0 ** math.floor(math.log10(raw))
    step = next(m * power for m in (1.0, 2.0, 2.5, 5.0, 10.0) if m * power >= raw * 0.999)
    first, last = math.floor(low / step + 1e-9), math.ceil(high / step - 1e-9)
    return tuple(round(number * step, 12) for number in range(first, last + 1))


def tick_texts(ticks: Sequence[float]) -> tuple[str, ...]:
    """Print ticks with the decimals their step needs, true minus and thin-space groups."""
    decimals = 0
    while decimals < MOST_DECIMALS and any(
        not math.isclose(tick, round(tick, decimals), abs_tol=1e-9) for tick in ticks
    ):
        decimals += 1
    texts = []
    for tick in ticks:
        text = f"{abs(tick):,.{decimals}f}"
        text = text.replace(",", "\u2009" if abs(tick) >= GROUPED_FROM else "")
        texts.append(f"{MINUS}{text}" if tick < 0 else text)
    return tuple(texts)


def frame(
    axes: Axes, x_ticks: Sequence[float], y_ticks: Sequence[float], x_label: Runs, y_label: Runs
) -> list[Shape]:
    """Draw a thin grid, the two axes, their ticks with numbers, and their labels."""
    x0, x1 = axes.left, axes.left + axes.width
    y0, y1 = axes.bottom, axes.bottom + axes.height
    shapes: list[Shape] = []
    for tick, text in zip(x_ticks, tick_texts(x_ticks), strict=True):
        x = axes.at(tick, axes.y_range[0])[0]
        shapes.append(Line((x, y0), (x, y1), "axes", 0.08))
        shapes.append(Line((x, y0 - TICK_LENGTH), (x, y0), "axes", THIN))
        shapes.append(Text((x, y0 - 3.0), words(text), "axes", TICK_TEXT))
    for tick, text in zip(y_ticks, tick_texts(y_ticks), strict=True):
        y = axes.at(axes.x_range[0], tick)[1]
        shapes.append(Line((x0, y), (x1, y), "axes", 0.08))
        shapes.append(Line((x0 - TICK_LENGTH, y), (x0, y), "axes", THIN))
        shapes.append(Text((x0 - 1.8, y), words(text), "axes", TICK_TEXT, "end"))
    shapes.append(Polyline(((x0, y1), (x0, y0), (x1, y0)), "axes", LIGHT))
    shapes.append(Text(((x0 + x1) / 2, y0 - 7.6), x_label, "axes"))
    shapes.append(Text((x0 - 12.2, (y0 + y1) / 2), y_label, "axes", rotation=90.0))
    return shapes


def curve(axes: Axes, points: Iterable[Point], dash: Dash = "solid") -> Polyline:
    """Draw a curve through value pairs; several curves are told apart by their dashes.

    Points without which it would look the same are left out.
    """
    on_paper = [axes.at(x, y) for x, y in points]
    seen = thinned([(round(x, _CURVE_DECIMALS), round(y, _CURVE_DECIMALS)) for x, y in on_paper])
    return Polyline(tuple(seen), "curve", CURVE_WEIGHT, dash)


def thinned(points: Sequence[Point], within: float = UNSEEN) -> list[Point]:
    """Return a line without the points that lie ``within`` a height [mm] of the line without them.

    From each point that stays, the line goes on as far as one straight piece passes all points
    between. Steps and pieces that run back stay as they are.

    >>> thinned([(0.0, 0.0), (1.0, 0.001), (2.0, 0.0), (2.0, 1.0), (3.0, 3.0)])
    [(0.0, 0.0), (2.0, 0.0), (2.0, 1.0), (3.0, 3.0)]
    """
    kept = list(points[:1])
    low, high = -math.inf, math.inf  # slopes from the last kept point that pass all since
    for before, point in pairwise(points):
        start = kept[-1]
        run, rise = point[0] - start[0], point[1] - start[1]
        if before != start and not (run > 0 and low <= rise / run <= high):
            kept.append(before)
            low, high = -math.inf, math.inf
            run, rise = point[0] - before[0], point[1] - before[1]
        if run > 0:
            low, high = max(low, (rise - within) / run), min(high, (rise + within) / run)
        else:
            low, high = math.inf, -math.inf
    return [*kept, *points[-1:]] if len(points) > 1 else kept


def level(axes: Axes, y: float, dash: Dash) -> Line:
    """Draw a horizontal line at the value ``y`` over the whole width."""
    return Line(
        axes.at(axes.x_range[0], y), axes.at(axes.x_range[1], y), "curve", LEVEL_WEIGHT, dash
    )


def drop_lines(axes: Axes, point: Point) -> list[Shape]:
    """Mark a value pair with a solid dot and dashed lines to both axes."""
    x, y = axes.at(*point)
    return [
        Line((x, y), (x, axes.bottom), "curve", THIN, "dashed"),
        Line((x, y), (axes.left, y), "curve", THIN, "dashed"),
        Circle((x, y), 0.75, "curve"),
    ]


def spread(levels: Sequence[float], gap: float, low: float, high: float) -> list[float]:
    """Move label positions apart to at least ``gap``, in their order, kept within low and high.

    >>> spread([10.0, 11.0], 4.0, 0.0, 50.0)
    [8.5, 12.5]
    """
    order = sorted(range(len(levels)), key=lambda index: levels[index])
    placed = [levels[index] for index in order]
    for _ in range(60):
        for lower in range(len(placed) - 1):
            lack = gap - (placed[lower + 1] - placed[lower])
            if lack > 0.0:
                placed[lower] -= lack / 2
                placed[lower + 1] += lack / 2
        placed = [
            min(max(y, low + i * gap), high - (len(placed) - 1 - i) * gap)
            for i, y in enumerate(placed)
        ]
    result = [0.0] * len(levels)
    for index, y in zip(order, placed, strict=True):
        result[index] = round(y, 6)
    return result
