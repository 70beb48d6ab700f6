"""Bars of an elevation drawn apart from the beam: one line a run, with mark and cut-off lengths.

Runs that do not come near each other share a row. Heights are in mm on paper.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

from lineproof.beams.continuous.figure_elevation_cuts import (
    LEAST_SHOWN,
    NUMBER,
    Cut,
    cut_lengths,
)
from lineproof.beams.continuous.figure_elevation_gaps import Short
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
from lineproof.drawing.metrics import PAGE_WIDTH, text_width

LABEL = 2.5
"""Text size of marks."""
OVER_BAR, OVER_HOOK = 1.25, 3.6
UNDER_BAR, UNDER_HOOK = 3.5, 5.3
"""Heights of labels over and of dimensions under a bar, without and with a hook in their way."""
LOWER = 3.4
"""From one dimension of cut-off lengths to the one under it."""
LABEL_TOP, ROW_GAP = 1.8, 2.2
HOOK, ROUND = 2.4, 0.8
APART = 1.6


@dataclass(frozen=True, slots=True)
class Pulled:
    """One run as drawn: its visible part, its label, its cut-off lengths, what it occupies.

    ``rise`` and ``drop`` are the heights of label and dimensions over and under the bar.
    """

    run: BarRun
    start: float
    end: float
    label: Runs
    middle: float
    rise: float
    drop: float
    cuts: tuple[Cut, ...]
    reach: tuple[float, float]


def pulled_bars(
    view: View, bars: Sequence[BarRun], grade: str, short: Sequence[Short] = ()
) -> list[list[Pulled]]:
    """Return rows of runs, nearest the beam first, so that nothing in a row touches.

    Ends of bars in a stretch that is ``short`` of bars are dimensioned before others.
    """
    low, high = view.own
    shown = [run for run in bars if run.start < high - LEAST_SHOWN and run.end > low + LEAST_SHOWN]
    shown.sort(key=lambda run: (run.place == "overhang", run.layer, run.start, -run.end))
    rows: list[list[Pulled]] = []
    for run in shown:
        drawn = _pulled(view, run, grade, short)
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


def _pulled(view: View, run: BarRun, grade: str, short: Sequence[Short]) -> Pulled:
    start, end = max(run.start, view.low), min(run.end, view.high)
    label = _label(run, grade)
    half = text_width(label, LABEL) / 2
    left, right = view.paper(start), view.paper(end)
    middle = min(max((left + right) / 2, half + 1.0), PAGE_WIDTH - half - 1.0)
    over_end = middle - half < left + 1.2 or middle + half > right - 1.2
    cut_off = start > run.start or end < run.end
    hooked = bool(run.hook_start or run.hook_end)
    in_way = over_end and (cut_off or (hooked and run.face == "bottom"))
    cuts = cut_lengths(view, run, short)
    ends = [left, right, middle - half, middle + half]
    for cut in cuts:
        ends.extend(cut.reach(view))
    return Pulled(
        run,
        start,
        end,
        label,
        middle,
        OVER_HOOK if in_way else OVER_BAR,
        UNDER_HOOK if hooked and run.face == "top" else UNDER_BAR,
        cuts,
        (min(ends), max(ends)),
    )


def _label(run: BarRun, grade: str) -> Runs:
    where = {"overhang": " in flange", "side face": " side faces"}.get(run.place, "")
    layer = f", layer {run.layer}" if run.layer > 1 and run.place == "web" else ""
    text = f" {run.number}-{run.size} × {shape_of(run, grade).cut:.0f}{where}{layer}"
    return ((run.mark, "bold"), (text, "roman"))


def height_of(row: Sequence[Pulled]) -> tuple[float, float]:
    """Return how far a row reaches over and under its bars, mm on paper."""
    up = max(bar.rise for bar in row) + LABEL_TOP
    lower = {bar.drop + LOWER for bar in row if any(cut.lower for cut in bar.cuts)}
    return up, max(*lower, *(bar.drop for bar in row), 0.0) + 1.0


def levels(rows: Sequence[Sequence[Pulled]], first: float, way: int) -> tuple[list[float], float]:
    """Return the height of the bars of each row, going up or down from ``first``, and the end."""
    at = first
    heights = []
    for row in rows:
        up, down = height_of(row)
        near, far = (down, up) if way > 0 else (up, down)
        heights.append(at + way * near)
        at += way * (near + far + ROW_GAP)
    return heights, at


def draw_rows(
    view: View, rows: Sequence[Sequence[Pulled]], heights: Sequence[float]
) -> list[Shape]:
    """Draw the rows at their heights."""
    return [
        shape
        for row, height in zip(rows, heights, strict=True)
        for bar in row
        for shape in _draw(view, bar, height)
    ]


def _draw(view: View, bar: Pulled, height: float) -> list[Shape]:
    y = view.mm(height)
    run = bar.run
    turn = -1.0 if run.face == "top" else 1.0
    bend = view.mm(ROUND)
    start = bar.start + (bend if run.hook_start == "180" and view.low <= run.start else 0.0)
    end = bar.end - (bend if run.hook_end == "180" and run.end <= view.high else 0.0)
    shapes: list[Shape] = [Line((start, y), (end, y), "bars", OUTLINE)]
    for at, hook, inward in ((run.start, run.hook_start, 1.0), (run.end, run.hook_end, -1.0)):
        if view.low <= at <= view.high:
            shapes.extend(_hook(view, hook, (at, y), inward, turn))
        else:
            shapes.append(_break(view, bar.start if inward > 0 else bar.end, y))
    shapes += [_cut_dimension(cut, y, bar.drop) for cut in bar.cuts]
    at_label = view.at(bar.middle, height + bar.rise)
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
        centre = (x + inward * radius, y + turn * radius)
        angles = (90.0, 270.0) if inward > 0 else (270.0, 450.0)
        far = y + turn * 2 * radius
        tail = Line((centre[0], far), (centre[0] + inward * view.mm(1.6), far), "bars", OUTLINE)
        return [Arc(centre, radius, *angles, "bars", OUTLINE), tail]
    return []


def _break(view: View, x: float, y: float) -> Polyline:
    """Mark a bar that goes on beyond the drawing."""
    w, h = view.mm(0.45), view.mm(0.8)
    return Polyline(
        ((x - w, y - h), (x + w, y - h / 4), (x - w, y + h / 4), (x + w, y + h)), "bars", MEDIUM
    )


def _cut_dimension(cut: Cut, y: float, drop: float) -> Dimension:
    ends = (cut.axis, y), (cut.end, y)
    offset = -drop - (LOWER if cut.lower else 0.0)
    return Dimension(*ends, "horizontal", offset, size=NUMBER, outside=cut.outside)


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
