"""Loads of a beam by type on its spans: uniform, partial and point loads with their sizes.

Each load type has a lane above the beam; in a lane loads stand over one another where they or
their texts would touch. Lengths along the beam are to scale, heights of loads are not.
"""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass, replace
from itertools import pairwise

from lineproof.beams.analysis.model import (
    Load,
    PartialLoad,
    PointLoad,
    Support,
    UniformLoad,
)
from lineproof.beams.continuous.symbols import letter
from lineproof.drawing import (
    LIGHT,
    MEDIUM,
    THIN,
    Arrow,
    Dimension,
    Figure,
    Line,
    Point,
    Polyline,
    Runs,
    Shape,
    Text,
    words,
)
from lineproof.drawing.metrics import PAGE_WIDTH, text_width
from lineproof.quantity.digits import fixed

RIGHT = 7.0
SIZE, NAME = 2.4, 2.8
BAND, POINT = 3.0, 5.0
"""Heights of a uniform load and of a point load on paper."""
LEVEL, LANE_GAP = 7.6, 2.2
BEAM, FOOT, GROUND = 2.4, 17.0, 4.2
APART = 1.4
TOUCH = 1e-6
ARROWS = 5.5
"""Distance between the arrows of a uniform load on paper."""


@dataclass(frozen=True, slots=True)
class Stretch:
    """A load on the beam: ``start`` and ``end`` along it [mm] (equal: a point), its text."""

    start: float
    end: float
    text: str
    upward: bool = False

    @property
    def point(self) -> bool:
        """Whether it acts at one point."""
        return self.start == self.end


@dataclass(frozen=True, slots=True)
class Placed:
    """A stretch on its level of a lane, and the middle of its text on paper."""

    stretch: Stretch
    level: int
    middle: float
    reach: tuple[float, float]


def loads_figure(
    lengths: Sequence[float],
    supports: Sequence[Support],
    loads: Sequence[Load],
    names: Mapping[str, str] | None = None,
) -> Figure:
    """Draw spans [mm], supports and loads; ``names`` gives words for load types (``D``: dead)."""
    kinds = list(dict.fromkeys(load.kind for load in loads))
    titles = {kind: (names or {}).get(kind, "") for kind in kinds}
    left = 6.0 + max((text_width(_title(kind, titles[kind]), NAME) for kind in kinds), default=6.0)
    scale = (PAGE_WIDTH - left - RIGHT) / sum(lengths)
    pen = _Pen(scale, left)
    axes = [sum(lengths[:number]) for number in range(len(lengths) + 1)]
    base = FOOT + GROUND + BEAM + 1.2
    shapes: list[Shape] = []
    lanes: list[str] = []
    for kind in kinds:
        stretches = _stretches(axes, [load for load in loads if load.kind == kind])
        placed = _levels(pen, stretches)
        levels = 1 + max(each.level for each in placed)
        shapes.append(
            Text(pen.at(3.0, base + BAND / 2), _title(kind, titles[kind]), "loads", NAME, "start")
        )
        for each in placed:
            shapes.extend(_draw(pen, each, base + each.level * LEVEL))
        lanes.append(f"{titles[kind] or kind}: " + ", ".join(s.text for s in stretches))
        base += levels * LEVEL + LANE_GAP
    shapes += _beam(pen, axes)
    for number, support in enumerate(supports, start=1):
        shapes.extend(_support(pen, axes[number - 1], support, number, len(supports)))
    shapes += [
        Dimension((a, pen.mm(FOOT - 6.0)), (b, pen.mm(FOOT - 6.0)), "horizontal", -4.0)
        for a, b in pairwise(axes)
    ]
    note = "Spans in mm; loads not to scale"
    placed_loads = any(not isinstance(load, UniformLoad) for load in loads)
    note += "; places from the left end of the span, in m." if placed_loads else "."
    shapes.append(Text(pen.at(2.0, 2.2), words(note), "text", 2.6, "start"))
    spans = ", ".join(f"{length:.0f}" for length in lengths)
    alt = f"Beam of spans {spans} mm. " + ". ".join(lanes) + "."
    return Figure(
        PAGE_WIDTH,
        round(base + 1.0, 1),
        scale,
        (left, 0.0),
        tuple(shapes),
        alt[:3900],
        "Loads by type, unfactored",
    )


@dataclass(frozen=True, slots=True)
class _Pen:
    """Turn mm on paper into drawing units and back."""

    scale: float
    left: float

    def mm(self, paper: float) -> float:
        return paper / self.scale

    def paper(self, x: float) -> float:
        return self.left + x * self.scale

    def at(self, x: float, y: float) -> tuple[float, float]:
        """Drawing point of a place on paper."""
        return (x - self.left) / self.scale, y / self.scale


def _title(kind: str, name: str) -> Runs:
    title: Runs = ((letter(kind), "bold"),)
    return (*title, (f"  {name}", "roman")) if name else title


def _stretches(axes: Sequence[float], loads: Sequence[Load]) -> list[Stretch]:
    """Turn loads into stretches along the beam; equal uniform loads of neighbours are joined."""
    found: list[Stretch] = []
    for load in loads:
        start = axes[load.span - 1]
        match load:
            case UniformLoad():
                new = Stretch(start, axes[load.span], f"{fixed(load.w, 1)} kN/m", load.w < 0.0)
                found = _joined(found, new)
            case PartialLoad():
                where = f"{load.start / 1e3:.2f} to {load.end / 1e3:.2f}"
                text = f"{fixed(load.w, 1)} kN/m, {where}"
                found.append(Stretch(start + load.start, start + load.end, text, load.w < 0.0))
            case PointLoad():
                text = f"{fixed(load.P / 1e3, 1)} kN at {load.at / 1e3:.2f}"
                found.append(Stretch(start + load.at, start + load.at, text, load.P < 0.0))
    return found


def _joined(found: list[Stretch], new: Stretch) -> list[Stretch]:
    for index, old in enumerate(found):
        if old.end == new.start and old.text == new.text and not old.point:
            return [*found[:index], replace(old, end=new.end), *found[index + 1 :]]
    return [*found, new]


def _levels(pen: _Pen, stretches: Sequence[Stretch]) -> list[Placed]:
    """Put long loads lowest; each on the lowest level where it and its text are free."""
    order = sorted(stretches, key=lambda each: (each.point, each.start - each.end, each.start))
    placed: list[Placed] = []
    for stretch in order:
        width = text_width(words(stretch.text), SIZE)
        low, high = pen.paper(stretch.start), pen.paper(stretch.end)
        middle = min(max((low + high) / 2, width / 2 + 1.0), PAGE_WIDTH - width / 2 - 1.0)
        reach = (min(low, middle - width / 2), max(high, middle + width / 2))
        level = 0
        while any(
            old.level == level
            and reach[0] < old.reach[1] + APART
            and old.reach[0] < reach[1] + APART
            and not _meet(old.stretch, stretch, reach, old.reach)
            for old in placed
        ):
            level += 1
        placed.append(Placed(stretch, level, middle, reach))
    return placed


def _meet(
    one: Stretch, two: Stretch, reach: tuple[float, float], other: tuple[float, float]
) -> bool:
    """Tell whether two uniform loads only touch at a support while their texts are apart."""
    touching = one.end == two.start or two.end == one.start
    overlap = min(reach[1], other[1]) - max(reach[0], other[0])
    return touching and not one.point and not two.point and overlap <= TOUCH


def _draw(pen: _Pen, placed: Placed, base: float) -> list[Shape]:
    stretch = placed.stretch
    if stretch.point:
        top = base + POINT - 0.6
        ends = (stretch.start, pen.mm(top)), (stretch.start, pen.mm(base))
        shapes: list[Shape] = [Arrow(*_way(stretch, *ends), "loads", MEDIUM, 2.0)]
        at = pen.at(placed.middle, top + 1.4)
        return [*shapes, Text(at, words(stretch.text), "loads", SIZE)]
    low, high = pen.mm(base), pen.mm(base + BAND)
    corners = ((stretch.start, low), (stretch.end, low), (stretch.end, high), (stretch.start, high))
    shapes = [Polyline(corners, "loads", LIGHT, closed=True)]
    length = (stretch.end - stretch.start) * pen.scale
    count = max(2, round(length / ARROWS))
    for number in range(count + 1):
        x = stretch.start + (stretch.end - stretch.start) * number / count
        shapes.append(Arrow(*_way(stretch, (x, high), (x, low)), "loads", THIN, 1.2))
    at = pen.at(placed.middle, base + BAND + 1.9)
    shapes.append(Text(at, words(stretch.text), "loads", SIZE))
    return shapes


def _way(stretch: Stretch, high: Point, low: Point) -> tuple[Point, Point]:
    """Return start and end of an arrow: down, or up for a load that lifts."""
    return (low, high) if stretch.upward else (high, low)


def _beam(pen: _Pen, axes: Sequence[float]) -> list[Shape]:
    low, high = pen.mm(FOOT + GROUND), pen.mm(FOOT + GROUND + BEAM)
    corners = ((0.0, low), (axes[-1], low), (axes[-1], high), (0.0, high))
    return [Polyline(corners, closed=True, weight=MEDIUM, fill="white")]


def _support(pen: _Pen, x: float, support: Support, number: int, count: int) -> list[Shape]:
    """Draw a triangle, a clamped wall, or a column above and below; a number under each."""
    beam = FOOT + GROUND
    at = pen.paper(x)
    if support.kind == "free":
        return []
    label = Text(pen.at(at, FOOT - 3.6), words(str(number)), "text", NAME)
    if support.kind == "fixed":
        way = -1.0 if number == 1 else 1.0 if number == count else 0.0
        return [*_clamp(pen, at, way), label]
    if support.kind == "elastic":
        columns: list[Shape] = [
            Line(pen.at(at, beam - GROUND), pen.at(at, beam), weight=0.7),
            *_ground(pen, at, beam - GROUND),
        ]
        return [*columns, label]
    half = 1.9
    triangle = (
        pen.at(at, beam),
        pen.at(at - half, beam - GROUND + 0.9),
        pen.at(at + half, beam - GROUND + 0.9),
    )
    shapes: list[Shape] = [Polyline(triangle, weight=MEDIUM, closed=True, fill="white")]
    return [*shapes, *_ground(pen, at, beam - GROUND + 0.9), label]


def _ground(pen: _Pen, at: float, level: float) -> list[Shape]:
    shapes: list[Shape] = [Line(pen.at(at - 2.8, level), pen.at(at + 2.8, level), weight=MEDIUM)]
    for number in range(6):
        x = at - 2.4 + number
        shapes.append(Line(pen.at(x, level), pen.at(x - 0.9, level - 0.9), weight=THIN))
    return shapes


def _clamp(pen: _Pen, at: float, way: float) -> list[Shape]:
    """Draw the face of a wall at an end; between spans a heavy stroke across the beam."""
    low, high = FOOT + GROUND - 1.8, FOOT + GROUND + BEAM + 0.8
    shapes: list[Shape] = [Line(pen.at(at, low), pen.at(at, high), weight=0.7)]
    if way:
        for number in range(4):
            y = low + 0.6 + number * 1.1
            shapes.append(Line(pen.at(at, y), pen.at(at + way * 1.2, y - 0.9), weight=THIN))
    else:
        shapes += _ground(pen, at, low)
    return shapes
