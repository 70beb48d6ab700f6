"""Bars of an elevation drawn apart from the beam: one line a run, with mark and cut-off lengths.

Runs that do not come near each other share a row. Heights are in mm on paper.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from typing import Literal

from lineproof.beams.continuous.figure_elevation_view import View
from lineproof.beams.continuous.layout import BarRun, Hook
from lineproof.beams.continuous.schedule import shape_of
from lineproof.drawing import (
    MEDIUM,
    OUTLINE,
    THIN,
    Arc,
    Dimension,
    Line,
    Polyline,
    Runs,
    Shape,
    Text,
)
from lineproof.drawing.metrics import text_width
from lineproof.drawing.paper import FIT_MARGIN

LABEL, NUMBER = 2.5, 2.3
"""Text sizes of marks and of cut-off lengths."""
PITCH = 8.8
OVER_BAR, DIMENSION = 1.25, -3.5
HOOK, ROUND = 2.4, 0.8
APART = 1.6
LEAST_SHOWN = 1.0


@dataclass(frozen=True, slots=True)
class Cut:
    """A cut-off length: between a support axis and an end of the bar, and where its text goes."""

    axis: float
    end: float
    outward: bool

    @property
    def length(self) -> float:
        """Distance of the end of the bar from the axis [mm]."""
        return abs(self.end - self.axis)


@dataclass(frozen=True, slots=True)
class Pulled:
    """One run as drawn: its visible part, its label, its cut-off lengths, what it occupies."""

    run: BarRun
    start: float
    end: float
    label: Runs
    middle: float
    cuts: tuple[Cut, ...]
    reach: tuple[float, float]


def pulled_bars(view: View, bars: Sequence[BarRun], grade: str) -> list[list[Pulled]]:
    """Return rows of runs, nearest the beam first, so that nothing in a row touches."""
    low, high = view.own
    shown = [run for run in bars if run.start < high - LEAST_SHOWN and run.end > low + LEAST_SHOWN]
    shown.sort(key=lambda run: (run.place == "overhang", run.layer, run.start, -run.end))
    rows: list[list[Pulled]] = []
    for run in shown:
        drawn = _pulled(view, run, grade)
        free = next((row for row in rows if _fits(row, drawn)), None)
        if free is None:
            rows.append([drawn])
        else:
            free.append(drawn)
    return rows


def _fits(row: Sequence[Pulled], new: Pulled) -> bool:
    return all(
        new.reach[1] + APART <= old.reach[0] or old.reach[1] + APART <= new.reach[0] for old in row
    )


def _pulled(view: View, run: BarRun, grade: str) -> Pulled:
    start, end = max(run.start, view.low), min(run.end, view.high)
    label = _label(run, grade)
    left, right = view.paper(start), view.paper(end)
    middle = _label_place(view, run, text_width(label, LABEL), (left, right))
    cuts = _cuts(view, run)
    half = text_width(label, LABEL) / 2
    ends = [left, right, middle - half, middle + half]
    for cut in cuts:
        ends.extend(_cut_reach(view, run, cut))
    return Pulled(run, start, end, label, middle, cuts, (min(ends), max(ends)))


def _label(run: BarRun, grade: str) -> Runs:
    where = {"overhang": " in flange", "side face": " side faces"}.get(run.place, "")
    layer = f", layer {run.layer}" if run.layer > 1 and run.place == "web" else ""
    text = f" {run.number}-{run.size} × {shape_of(run, grade).cut:.0f}{where}{layer}"
    return ((run.mark, "bold"), (text, "roman"))


def _label_place(view: View, run: BarRun, width: float, bar: tuple[float, float]) -> float:
    """Middle of the label: over the bar, clear of an upward hook, inside the paper."""
    left, right = bar
    middle = (left + right) / 2
    room = width / 2 + 1.0
    if run.face == "bottom" and run.hook_start and middle - room < left:
        middle = left + room
    elif run.face == "bottom" and run.hook_end and middle + room > right:
        middle = right - room
    return min(max(middle, room), view.width - room)


def _cuts(view: View, run: BarRun) -> tuple[Cut, ...]:
    """Cut-off lengths from the nearest axes; at a hook beside a longer one it is left out."""
    axes = view.outline.axes
    ends = [
        (at, hook, min(axes, key=lambda axis: abs(axis - at)))
        for at, hook in ((run.start, run.hook_start), (run.end, run.hook_end))
        if view.low <= at <= view.high
    ]
    same = len(ends) > 1 and ends[0][2] == ends[1][2]
    cuts = []
    for at, hook, axis in ends:
        cut = Cut(axis, at, outward=same)
        crowded = same and bool(hook) and not _cut_fits(view, cut)
        if cut.length >= LEAST_SHOWN and not crowded:
            cuts.append(cut)
    return tuple(cuts)


def _cut_width(cut: Cut) -> float:
    return text_width(((f"{cut.length:.0f}", "roman"),), NUMBER) + FIT_MARGIN


def _cut_fits(view: View, cut: Cut) -> bool:
    return _cut_width(cut) <= cut.length * view.scale


def _outside(run: BarRun, cut: Cut) -> Literal["start", "end"]:
    """Side of the dimension at which a text stands that does not fit into it."""
    at_start = cut.end == run.start
    return "start" if at_start == cut.outward else "end"


def _cut_reach(view: View, run: BarRun, cut: Cut) -> tuple[float, float]:
    low, high = sorted((view.paper(cut.axis), view.paper(cut.end)))
    if _cut_fits(view, cut):
        return low - 1.0, high + 1.0
    more = _cut_width(cut) + 0.4
    return (low - more, high) if _outside(run, cut) == "start" else (low, high + more)


def draw_rows(view: View, rows: Sequence[Sequence[Pulled]], first: float, way: int) -> list[Shape]:
    """Draw the rows from the height ``first`` on, upward (way 1) or downward (way -1)."""
    shapes: list[Shape] = []
    for number, row in enumerate(rows):
        for bar in row:
            shapes.extend(_draw(view, bar, first + way * number * PITCH))
    return shapes


def _draw(view: View, bar: Pulled, height: float) -> list[Shape]:
    y = view.mm(height)
    run = bar.run
    turn = -1.0 if run.face == "top" else 1.0
    shapes: list[Shape] = [Line((bar.start, y), (bar.end, y), "bars", OUTLINE)]
    for at, hook, inward in ((run.start, run.hook_start, 1.0), (run.end, run.hook_end, -1.0)):
        if view.low <= at <= view.high:
            shapes.extend(_hook(view, hook, (at, y), inward, turn))
        else:
            shapes.append(_break(view, bar.start if inward > 0 else bar.end, y))
    shapes += [_cut_dimension(run, cut, y) for cut in bar.cuts]
    at_label = view.at(bar.middle, height + OVER_BAR)
    shapes.append(Text(at_label, bar.label, "text", LABEL, valign="baseline"))
    return shapes


def _hook(
    view: View, hook: Hook, at: tuple[float, float], inward: float, turn: float
) -> list[Shape]:
    x, y = at
    if hook == "90":
        return [Line(at, (x, y + turn * view.mm(HOOK)), "bars", OUTLINE)]
    if hook == "180":
        radius = view.mm(ROUND)
        centre = (x, y + turn * radius)
        angles = (90.0, 270.0) if inward > 0 else (270.0, 450.0)
        far = y + turn * 2 * radius
        tail = Line((x, far), (x + inward * view.mm(1.6), far), "bars", OUTLINE)
        return [Arc(centre, radius, *angles, "bars", OUTLINE), tail]
    return []


def _break(view: View, x: float, y: float) -> Polyline:
    """Mark a bar that goes on beyond the drawing."""
    w, h = view.mm(0.5), view.mm(1.0)
    return Polyline(
        ((x - w, y - h), (x + w, y - h / 4), (x - w, y + h / 4), (x + w, y + h)), "bars", MEDIUM
    )


def _cut_dimension(run: BarRun, cut: Cut, y: float) -> Dimension:
    ends = (cut.axis, y), (cut.end, y)
    return Dimension(*ends, "horizontal", DIMENSION, size=NUMBER, outside=_outside(run, cut))


def bars_in_place(view: View, bars: Sequence[BarRun], cover: float) -> list[Shape]:
    """Draw the bars inside the concrete at their true heights, as thin lines."""
    shapes: list[Shape] = []
    for run in bars:
        if run.place == "side face":
            continue
        start, end = max(run.start, view.low), min(run.end, view.high)
        if start >= end:
            continue
        inset = cover + run.diameter / 2 + (run.layer - 1) * (run.diameter + 40.0)
        if run.face == "top":
            shapes.append(Line((start, -inset), (end, -inset), "bars", THIN))
            continue
        for low, high, depth in depth_steps(view):
            a, b = max(start, low), min(end, high)
            if a < b:
                shapes.append(Line((a, inset - depth), (b, inset - depth), "bars", THIN))
    return shapes


def depth_steps(view: View) -> list[tuple[float, float, float]]:
    """Return stretches of one depth, from axis to axis: from, to, depth."""
    outline = view.outline
    axes = [outline.ends[0], *outline.axes[1:-1], outline.ends[1]]
    return [(axes[index], axes[index + 1], depth) for index, depth in enumerate(outline.depths)]
