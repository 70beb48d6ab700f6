"""Loads, supports, reactions and moment of a simple span as a figure."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

from lineproof.drawing import (
    LIGHT,
    MEDIUM,
    THIN,
    Arrow,
    Dimension,
    Figure,
    Line,
    Polyline,
    Runs,
    Shape,
    Text,
    symbol,
    words,
)
from lineproof.drawing.metrics import text_width

PAGE_WIDTH = 165.0
LEFT = 18.0
BEAM_DEPTH = 3.0
SUPPORT = 4.0
TALLEST_BANDS = 24.0
SMALLEST_BAND = 4.0
MOMENT_HEIGHT = 13.0


@dataclass(frozen=True, slots=True)
class UniformLoad:
    """A load over the whole span: its name, its size in kN/m, and its size as printed."""

    name: str
    size: float
    printed: str


def loading_figure(
    span: float,
    loads: Sequence[UniformLoad],
    *,
    reactions: tuple[Runs, Runs] = ((), ()),
    note: str = "",
    moment: Runs = (),
    caption: str = "Loading",
) -> Figure:
    """Draw a simple span of ``span`` mm with its loads stacked in the order given.

    The lowest band is the first load. ``reactions`` are the printed labels of both reactions,
    ``note`` stands above the loads (such as the tributary width), ``moment`` labels the greatest
    moment of a parabola drawn below; without it no moment is drawn.
    """
    labels = max((text_width(_label(load), 2.8) for load in loads), default=0.0)
    length = PAGE_WIDTH - LEFT - 4.0 - max(labels, 14.0) - 4.0
    bottom = MOMENT_HEIGHT + 8.0 if moment else 1.0
    tail = bottom + 9.0
    beam = tail + SUPPORT + (11.0 if any(reactions) else 2.0)
    scale = length / span
    pen = _Pen(scale)
    shapes: list[Shape] = []
    top = _bands(pen, span, loads, beam + BEAM_DEPTH, shapes)
    shapes.append(_beam(pen, span, beam))
    for x, rolling in ((0.0, False), (span, True)):
        shapes.extend(_support(pen, x, beam, rolling=rolling))
    for x, label in zip((0.0, span), reactions, strict=True):
        if label:
            shapes.extend(_reaction(pen, x, beam - SUPPORT - 1.6, label))
    level = (0.0, pen.y(tail)), (span, pen.y(tail))
    shapes.append(Dimension(*level, "horizontal", -6.0, symbol("l"), f"{span:.0f} mm"))
    if moment:
        shapes.extend(_moment(pen, span, 3.0, moment))
    if note:
        shapes.append(Text((0.0, pen.y(top + 4.0)), words(note), anchor="start"))
    height = top + (8.0 if note else 3.0)
    return Figure(
        PAGE_WIDTH,
        round(height, 1),
        scale,
        (LEFT, 0.0),
        tuple(shapes),
        _alt(span, loads),
        caption,
    )


@dataclass(frozen=True, slots=True)
class _Pen:
    """Turn mm on paper into drawing units."""

    scale: float

    def y(self, paper: float) -> float:
        return paper / self.scale


def _label(load: UniformLoad) -> Runs:
    return ((f"{load.name}  ", "roman"), (load.printed, "bold"))


def _bands(
    pen: _Pen, span: float, loads: Sequence[UniformLoad], base: float, shapes: list[Shape]
) -> float:
    """Stack the loads above ``base`` (mm on paper); return the top of the stack."""
    height = min(TALLEST_BANDS, 6.0 + 6.0 * len(loads))
    spare = max(0.0, height - SMALLEST_BAND * len(loads))
    total = sum(load.size for load in loads) or 1.0
    low = base + 0.6
    for load in loads:
        high = low + SMALLEST_BAND + spare * load.size / total
        corners = ((0.0, low), (span, low), (span, high), (0.0, high))
        points = tuple((x, pen.y(y)) for x, y in corners)
        shapes.append(Polyline(points, "loads", LIGHT, closed=True))
        arrows = 12
        for number in range(arrows + 1):
            x = span * number / arrows
            shapes.append(Arrow((x, pen.y(high)), (x, pen.y(low)), "loads", THIN, 1.5))
        at = (span + 3.5 / pen.scale, pen.y((low + high) / 2))
        shapes.append(Text(at, _label(load), "loads", anchor="start"))
        low = high
    return low


def _beam(pen: _Pen, span: float, low: float) -> Polyline:
    end = 1.5 / pen.scale
    high = low + BEAM_DEPTH
    corners = ((-end, low), (span + end, low), (span + end, high), (-end, high))
    return Polyline(tuple((x, pen.y(y)) for x, y in corners), closed=True, fill="white")


def _support(pen: _Pen, x: float, beam: float, *, rolling: bool) -> list[Shape]:
    """Draw a triangle on hatched ground; a roller has a gap above the ground."""
    half = 2.2 / pen.scale
    foot = beam - SUPPORT + (0.9 if rolling else 0.0)
    ground = beam - SUPPORT
    triangle = ((x, pen.y(beam)), (x - half, pen.y(foot)), (x + half, pen.y(foot)))
    shapes: list[Shape] = [Polyline(triangle, weight=MEDIUM, closed=True, fill="white")]
    reach = 3.4 / pen.scale
    shapes.append(Line((x - reach, pen.y(ground)), (x + reach, pen.y(ground)), weight=MEDIUM))
    for number in range(7):
        start = x - reach + number * reach / 3
        end = (start - 1.1 / pen.scale, pen.y(ground - 1.1))
        shapes.append(Line((start, pen.y(ground)), end, weight=THIN))
    return shapes


def _reaction(pen: _Pen, x: float, top: float, label: Runs) -> list[Shape]:
    arrow = Arrow((x, pen.y(top - 9.0)), (x, pen.y(top)), "loads", MEDIUM, 2.2)
    at = (x + 2.0 / pen.scale, pen.y(top - 6.5))
    return [arrow, Text(at, label, "loads", anchor="start")]


def _moment(pen: _Pen, span: float, base: float, label: Runs) -> list[Shape]:
    steps = 40
    points = []
    for number in range(steps + 1):
        t = number / steps
        points.append((span * t, pen.y(base + MOMENT_HEIGHT * 4 * t * (1 - t))))
    shapes: list[Shape] = [
        Polyline(tuple(points), "loads", MEDIUM, closed=True, fill="hatch"),
        Text((span / 2, pen.y(base + 0.48 * MOMENT_HEIGHT)), label, "loads"),
    ]
    return shapes


def _alt(span: float, loads: Sequence[UniformLoad]) -> str:
    listed = ", ".join(f"{load.name} {load.printed}" for load in loads)
    return f"Simple span of {span:.0f} mm under uniform loads: {listed}."
