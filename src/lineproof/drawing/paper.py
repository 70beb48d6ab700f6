"""Lower a figure to strokes, fills and texts in mm on paper (y up), ready for any writer."""

from __future__ import annotations

import math
from dataclasses import dataclass, replace
from typing import Literal

from lineproof.drawing.hatch import hatch_lines
from lineproof.drawing.metrics import CAP_HEIGHT, depth_below_baseline, text_width
from lineproof.drawing.shapes import (
    MEDIUM,
    THIN,
    Arc,
    Arrow,
    Circle,
    Dimension,
    Figure,
    Line,
    Point,
    Polyline,
    Shape,
    Text,
)

EXTENSION_GAP = 0.9
EXTENSION_PAST = 1.2
TICK = 0.85
LINE_PAST = 1.0
TEXT_GAP = 1.0
FIT_MARGIN = 1.2
BESIDE_GAP = 1.6
BACKING_MARGIN = 0.25
DASHES = {"dashed": (2.0, 1.2), "long": (5.0, 1.4), "dotted": (0.45, 1.0),
          "chain": (5.0, 1.0, 0.9, 1.0)}  # fmt: skip
"""Lengths drawn and left out in turn, mm on paper."""

PaperShape = Line | Polyline | Circle | Arc


@dataclass(frozen=True, slots=True)
class Placed:
    """A text on paper: ``at`` is the baseline point of its anchor, mm."""

    text: Text
    at: Point
    width: float

    @property
    def corners(self) -> tuple[Point, ...]:
        """The four corners of the printed text, mm on paper."""
        left = {"start": 0.0, "middle": -self.width / 2, "end": -self.width}[self.text.anchor]
        low = -depth_below_baseline(self.text.runs, self.text.size)
        high = CAP_HEIGHT * self.text.size
        local = ((left, low), (left + self.width, low), (left + self.width, high), (left, high))
        return tuple(_turned(self.at, point, self.text.rotation) for point in local)

    @property
    def middle(self) -> Point:
        """The middle of the capitals, halfway along the text, mm on paper."""
        aside = {"start": self.width / 2, "middle": 0.0, "end": -self.width / 2}[self.text.anchor]
        return _turned(self.at, (aside, CAP_HEIGHT * self.text.size / 2), self.text.rotation)


def lower(figure: Figure) -> tuple[list[PaperShape], list[Placed]]:
    """Return the strokes and fills in their order, then the texts, all in mm on paper.

    Texts come last so that no line is ever drawn across them.
    """
    drawn: list[PaperShape] = []
    texts: list[Placed] = []
    for shape in figure.shapes:
        if isinstance(shape, Text):
            texts.append(_place(shape, figure.paper(shape.at)))
        elif isinstance(shape, Dimension):
            lines, text = _dimension(figure, shape)
            drawn.extend(lines)
            texts.append(text)
        else:
            drawn.extend(_stroke(figure, shape))
    return drawn, texts


def _stroke(figure: Figure, shape: Shape) -> list[PaperShape]:
    match shape:
        case Line():
            return [replace(shape, start=figure.paper(shape.start), end=figure.paper(shape.end))]
        case Polyline():
            on_paper = replace(shape, points=tuple(map(figure.paper, shape.points)))
            if shape.fill != "hatch":
                return [on_paper]
            lines = hatch_lines(on_paper.points)
            strokes = [Line(a, b, shape.layer, THIN) for a, b in lines]
            return [replace(on_paper, fill="white", weight=0.0), *strokes,
                    replace(on_paper, fill="none")]  # fmt: skip
        case Circle() | Arc():
            return [
                replace(
                    shape, centre=figure.paper(shape.centre), radius=figure.scale * shape.radius
                )
            ]
        case Arrow():
            return _arrow(figure.paper(shape.start), figure.paper(shape.end), shape)
    return []


def _arrow(start: Point, end: Point, shape: Arrow) -> list[PaperShape]:
    length = math.dist(start, end)
    if length == 0.0:
        return []
    head = min(shape.head, length)
    ux, uy = (end[0] - start[0]) / length, (end[1] - start[1]) / length
    foot = (end[0] - head * ux, end[1] - head * uy)
    half = 0.22 * head
    barbs = ((foot[0] - half * uy, foot[1] + half * ux), (foot[0] + half * uy, foot[1] - half * ux))
    tip = Polyline((end, *barbs), shape.layer, 0.0, closed=True, fill="black")
    return [Line(start, foot, shape.layer, shape.weight), tip]


def _place(text: Text, at: Point) -> Placed:
    if text.valign == "middle":
        drop = -CAP_HEIGHT * text.size / 2
        at = _turned(at, (0.0, drop), text.rotation)
    return Placed(text, at, text_width(text.runs, text.size))


def _turned(origin: Point, point: Point, degrees: float) -> Point:
    angle = math.radians(degrees)
    cosine, sine = math.cos(angle), math.sin(angle)
    return (
        origin[0] + point[0] * cosine - point[1] * sine,
        origin[1] + point[0] * sine + point[1] * cosine,
    )


def _dimension(figure: Figure, shape: Dimension) -> tuple[list[PaperShape], Placed]:
    """Draw in a frame whose first axis runs along the dimension, the second along the offset."""
    along = 0 if shape.direction == "horizontal" else 1
    points = sorted((figure.paper(shape.start), figure.paper(shape.end)), key=lambda p: p[along])
    level = figure.paper(shape.start)[1 - along] + shape.offset
    low, high = points[0][along], points[1][along]
    needed = text_width(shape.runs, shape.size) + FIT_MARGIN
    fits = needed <= high - low

    def at(position: float, across: float) -> Point:
        return (position, across) if along == 0 else (across, position)

    def thin(start: Point, end: Point, weight: float = THIN) -> Line:
        return Line(start, end, shape.layer, weight)

    drawn: list[PaperShape] = []
    for point in points:
        reach = level - point[1 - along]
        if abs(reach) > EXTENSION_GAP:
            sign = math.copysign(1.0, reach)
            first = point[1 - along] + sign * EXTENSION_GAP
            drawn.append(
                thin(at(point[along], first), at(point[along], level + sign * EXTENSION_PAST))
            )
    before, past = LINE_PAST, LINE_PAST
    if not fits and along == 0:
        before, past = (needed, past) if shape.outside == "start" else (before, needed)
    drawn.append(thin(at(low - before, level), at(high + past, level)))
    for end in (low, high):
        x, y = at(end, level)
        drawn.append(thin((x - TICK, y - TICK), (x + TICK, y + TICK), MEDIUM))
    return drawn, _dimension_text(shape, (low, high, level), fits=fits)


def _dimension_text(shape: Dimension, span: tuple[float, float, float], *, fits: bool) -> Placed:
    low, high, level = span
    middle = (low + high) / 2
    anchor: Literal["start", "middle", "end"] = "middle"
    rotation = 0.0
    valign: Literal["baseline", "middle"] = "baseline"
    if shape.direction == "horizontal":
        at = (middle, level + TEXT_GAP)
        if not fits and shape.outside == "end":
            at, anchor = (high + FIT_MARGIN, level + TEXT_GAP), "start"
        elif not fits:
            at, anchor = (low - FIT_MARGIN, level + TEXT_GAP), "end"
    elif fits:
        at, rotation = (level - TEXT_GAP, middle), 90.0
    else:
        side = math.copysign(1.0, shape.offset)
        at, valign = (level + side * BESIDE_GAP, middle), "middle"
        anchor = "start" if side > 0 else "end"
    text = Text(at, shape.runs, shape.layer, shape.size, anchor, valign, rotation)
    return _place(text, at)
