"""Test over prediction, beam by beam, as a figure of plain shapes."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from itertools import groupby

from lineproof.drawing import THIN, Circle, Figure, Line, Shape, Text, words
from lineproof.drawing.axes import TICK_TEXT, Axes, frame, level, nice_ticks
from lineproof.drawing.shapes import Fill

_WIDTH, _HEIGHT = 165.0, 88.0
_RADIUS = 1.1


@dataclass(frozen=True, slots=True)
class RatioPoint:
    """One test: its name, test over prediction, and the group it belongs to."""

    name: str
    ratio: float
    group: str


def ratio_figure(points: Sequence[RatioPoint], means: Sequence[tuple[str, float]]) -> Figure:
    """Draw test over prediction of every test, its groups side by side.

    ``means`` gives each group's mean, in the order of the groups. Above 1 the test was stronger
    than predicted.
    """
    ticks = nice_ticks(0.0, 1.1 * max(point.ratio for point in points), 8)
    axes = Axes(18.0, 18.0, _WIDTH - 22.0, _HEIGHT - 22.0, (0.0, len(points)), (0.0, ticks[-1]))
    shapes = frame(axes, (), ticks, words(""), words("test / prediction"))
    shapes = [shape for shape in shapes if not (isinstance(shape, Text) and not shape.runs[0][0])]
    shapes.append(level(axes, 1.0, "solid"))
    at = 0
    for (group, members), (_, mean) in zip(
        groupby(points, key=lambda point: point.group), means, strict=True
    ):
        kept = list(members)
        shapes += _group(axes, at, kept, mean, open_mark=at == 0)
        shapes += _heading(axes, at, len(kept), (group, f"mean {mean:.2f}"))
        at += len(kept)
    text = "; ".join(f"{point.name} {point.ratio:.2f}" for point in points)
    alt = f"Test over prediction of {len(points)} tests: {text}."
    caption = "Test over prediction; the line at 1 is a perfect prediction, dashes the means"
    return Figure(_WIDTH, _HEIGHT, 1.0, (0.0, 0.0), tuple(shapes), alt, caption)


def _group(
    axes: Axes, at: int, points: Sequence[RatioPoint], mean: float, *, open_mark: bool
) -> list[Shape]:
    shapes: list[Shape] = []
    y = axes.at(0.0, mean)[1]
    left, right = axes.at(at, 0.0)[0], axes.at(at + len(points), 0.0)[0]
    shapes.append(Line((left + 1.0, y), (right - 1.0, y), "curve", THIN, "dashed"))
    for place, point in enumerate(points):
        x, y = axes.at(at + place + 0.5, point.ratio)
        fill: Fill = "white" if open_mark else "black"
        shapes.append(Line((x, axes.bottom), (x, y), "axes", 0.08))
        shapes.append(Circle((x, y), _RADIUS, "curve", weight=0.3, fill=fill))
        shapes.append(Text((x, y + 3.2), words(f"{point.ratio:.2f}"), "curve", TICK_TEXT))
        shapes.append(Text((x, axes.bottom - 3.2), words(point.name), "axes", TICK_TEXT))
    return shapes


def _heading(axes: Axes, at: int, count: int, lines: tuple[str, str]) -> list[Shape]:
    x = axes.at(at + count / 2, 0.0)[0]
    return [
        Text((x, axes.bottom - 8.5 - 4.2 * number), words(line), "axes")
        for number, line in enumerate(lines)
    ]
