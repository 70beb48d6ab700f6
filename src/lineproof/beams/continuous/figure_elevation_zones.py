"""Stirrups of an elevation, and the row that names their zones. Heights are in mm on paper."""

from __future__ import annotations

from collections.abc import Sequence

from lineproof.beams.continuous.figure_elevation_view import View
from lineproof.beams.continuous.figure_rows import between, side_by_side
from lineproof.beams.continuous.layout import StirrupZone, places_of
from lineproof.drawing import MEDIUM, THIN, Line, Runs, Shape, Text
from lineproof.drawing.axes import spread
from lineproof.drawing.metrics import PAGE_WIDTH, text_width

SIZE = 2.3
LINE, TICK = -2.0, 0.85
APART = 1.4
_TIES = "ties"
FARTHEST = 9.0
"""How far a name may stand beside the middle of its zone."""


def stirrup_lines(view: View, zones: Sequence[StirrupZone]) -> list[Shape]:
    """Draw each stirrup in its place."""
    cover = view.outline.cover
    shapes: list[Shape] = []
    for zone in zones:
        depth = view.outline.depths[zone.span - 1]
        shapes += [
            Line((x, -cover), (x, cover - depth), "stirrups", THIN * 0.8)
            for x in places_of(zone)
            if view.low <= x <= view.high
        ]
    return shapes


def zone_block(view: View, zones: Sequence[StirrupZone], top: float) -> tuple[list[Shape], float]:
    """Draw a line a zone with its name below; return the shapes and the height they take."""
    shown = sorted((z for z in zones if z.span in view.spans), key=lambda zone: zone.start)
    if not shown:
        return [], 0.0
    y = top + LINE
    shapes: list[Shape] = []
    for zone in shown:
        ends = dict.fromkeys((view.paper(zone.start), view.paper(zone.end)))  # one of a lone one
        if len(ends) > 1:
            across = [view.at(x, y) for x in ends]
            shapes.append(Line(across[0], across[1], "dimensions", THIN))
        shapes += [
            Line(view.at(x - TICK, y - TICK), view.at(x + TICK, y + TICK), "dimensions", MEDIUM)
            for x in ends
        ]
    middles = [view.paper((zone.start + zone.end) / 2) for zone in shown]
    axes = [view.paper(view.outline.axes[number - 1]) for number in view.supports]
    places = _in_one_row([_names(zone) for zone in shown], middles, axes)
    if places:
        for zone, middle, place in zip(shown, middles, places, strict=True):
            shapes += _flat(view, zone, middle, place, y)
        return shapes, 10.6
    names = [_one_line(zone) for zone in shown]
    longest = max(text_width(name, SIZE) for name in names)
    beside = between([SIZE] * len(names), middles, 0.85, PAGE_WIDTH - 0.85, axes, 0.7)
    beside = beside or spread(middles, SIZE + 0.7, 2.0, PAGE_WIDTH - 2.0)
    for name, middle, place in zip(names, middles, beside, strict=True):
        start = view.at(middle, y - 0.4), view.at(place, y - 1.9)
        shapes.append(Line(*start, "dimensions", THIN))
        at = view.at(place, y - 2.6)
        shapes.append(Text(at, name, "text", SIZE, "end", rotation=90.0))
    return shapes, longest + 5.0


def _names(zone: StirrupZone) -> tuple[Runs, Runs]:
    """Two lines: number, size and spacing; mark and length."""
    words = [f"{zone.end - zone.start:.0f}"] if zone.number > 1 else []
    words += [_TIES] if zone.around_hooks else []
    mark: Runs = ((f"{zone.mark}{' ' if words else ''}", "bold"),) if zone.mark else ()
    return ((_count(zone), "roman"),), (*mark, (" ".join(words), "roman"))


def _count(zone: StirrupZone) -> str:
    if zone.number == 1:
        return f"1-{zone.size}"
    return f"{zone.number}-{zone.size} @ {zone.spacing:.0f}"


def _one_line(zone: StirrupZone) -> Runs:
    mark: Runs = ((f"{zone.mark} ", "bold"),) if zone.mark else ()
    length = f" = {zone.end - zone.start:.0f}" if zone.number > 1 else ""
    ties = f", {_TIES}" if zone.around_hooks else ""
    return (*mark, (f"{_count(zone)}{length}{ties}", "roman"))


def _in_one_row(
    names: Sequence[tuple[Runs, Runs]], middles: Sequence[float], axes: Sequence[float]
) -> list[float]:
    """Places of the names in one row, clear of the axes where that brings none too far away.

    Failing that over the axes, on a white ground; none if one would still stand too far away.
    """
    widths = [max(text_width(line, SIZE) for line in lines) for lines in names]
    room = (0.5, PAGE_WIDTH - 0.5)
    for places in (
        between(widths, middles, *room, axes, APART), side_by_side(widths, middles, *room, APART)
    ):  # fmt: skip
        if places and all(abs(a - b) <= FARTHEST for a, b in zip(places, middles, strict=True)):
            return places
    return []


def _flat(view: View, zone: StirrupZone, middle: float, place: float, y: float) -> list[Shape]:
    first, second = _names(zone)
    return [
        Line(view.at(middle, y - 0.4), view.at(place, y - 1.7), "dimensions", THIN),
        Text(view.at(place, y - 3.6), first, "text", SIZE, backing=True),
        Text(view.at(place, y - 6.7), second, "text", SIZE, backing=True),
    ]
