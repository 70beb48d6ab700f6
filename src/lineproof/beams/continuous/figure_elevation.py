"""Elevation of a beam to scale: concrete, supports, stirrups, bars drawn apart, dimensions."""

from __future__ import annotations

from collections.abc import Sequence

from lineproof.beams.continuous.figure_elevation_bars import (
    bars_in_place,
    draw_rows,
    levels,
    pulled_bars,
)
from lineproof.beams.continuous.figure_elevation_concrete import STUB, axis_lines, concrete
from lineproof.beams.continuous.figure_elevation_gaps import Short, gap_notes, gap_shapes, shown
from lineproof.beams.continuous.figure_elevation_view import View, parts, view
from lineproof.beams.continuous.figure_elevation_zones import stirrup_lines, zone_block
from lineproof.beams.continuous.layout import BarRun, BeamOutline, Detailing
from lineproof.drawing import (
    LIGHT,
    OUTLINE,
    Arrow,
    Dimension,
    Figure,
    Line,
    Runs,
    Shape,
    Text,
    words,
)
from lineproof.drawing.metrics import PAGE_WIDTH, text_width
from lineproof.drawing.paper import FIT_MARGIN
from lineproof.quantity.digits import fixed

TOP_ROW = 5.0
"""Where the rows of top bars begin over the beam, mm on paper."""
HEAD = 4.5
"""Room for the names of the supports over the rows of bars, mm on paper."""
NOTE, LETTER = 2.6, 2.8
MANY = 3
COATED = "All bars and stirrups are coated with epoxy."
FEW_LINES, MANY_LINES = (16.5, 3.6), (15.6, 3.3)
"""How far below the bars the first of the notes stands and the next follows, mm on paper."""
Section = tuple[str, float]
"""Letter of a section and its station [mm]."""


def elevation_figures(
    outline: BeamOutline,
    detailing: Detailing,
    *,
    sections: Sequence[Section] = (),
    short: Sequence[Short] = (),
    grade: str = "400R",
    coated: bool = False,
) -> tuple[Figure, ...]:
    """Return the elevation in rows of spans, each at a scale that can be read on the page."""
    return tuple(
        elevation_figure(
            outline,
            detailing,
            spans=spans,
            sections=sections,
            short=short,
            grade=grade,
            coated=coated,
        )
        for spans in parts(outline)
    )


def elevation_figure(
    outline: BeamOutline,
    detailing: Detailing,
    *,
    spans: tuple[int, int] | None = None,
    sections: Sequence[Section] = (),
    short: Sequence[Short] = (),
    grade: str = "400R",
    coated: bool = False,
) -> Figure:
    """Draw the spans given (the whole beam without) on the width of the page.

    Stretches ``short`` of bars are hatched; ``coated`` bars are named. ``detailing`` has its marks
    (:func:`lineproof.beams.continuous.schedule.schedule`).
    """
    seen = view(outline, detailing, spans or (1, len(outline.lengths)))
    top = [run for run in detailing.bars if _above(run)]
    low = [run for run in detailing.bars if not _above(run)]
    rows_up, rows_down = (pulled_bars(seen, runs, grade, short) for runs in (top, low))
    tops, ceiling = levels(rows_up, TOP_ROW, 1)
    zones, zone_height = zone_block(seen, detailing.stirrups, -seen.deepest * seen.scale - STUB)
    first_low = -seen.deepest * seen.scale - STUB - zone_height - 2.0
    lows, floor = levels(rows_down, first_low, -1)
    notes = [*_note_lines(seen, detailing, short), *([COATED] if coated else [])]
    shapes = [
        *axis_lines(seen, ceiling, floor - 11.0),
        *concrete(seen),
        *stirrup_lines(seen, detailing.stirrups),
        *bars_in_place(seen, detailing.bars, outline.cover),
        *gap_shapes(seen, short),
        *_section_marks(seen, sections),
        *draw_rows(seen, rows_up, tops),
        *zones,
        *draw_rows(seen, rows_down, lows),
        *_spans(seen, floor),
        *_notes(seen, notes, floor),
    ]
    bottom = 24.0 - floor + MANY_LINES[1] * max(len(notes) - MANY, 0)
    return Figure(
        PAGE_WIDTH,
        round(bottom + ceiling + HEAD, 1),
        seen.scale,
        (round(seen.left - seen.low * seen.scale, 4), round(bottom, 1)),
        tuple(shapes),
        _alt(seen, detailing, short),
        _caption(seen),
    )


def _above(run: BarRun) -> bool:
    """Tell whether a run is drawn above the beam."""
    return run.face == "top" and run.place != "side face"


def _section_marks(seen: View, sections: Sequence[Section]) -> list[Shape]:
    """Mark where sections are cut: strokes above and below, arrow and letter above."""
    shapes: list[Shape] = []
    for letter, x in sections:
        if not seen.low <= x <= seen.high:
            continue
        height = seen.mm(1.0)
        depth = -seen.deepest
        shapes += [
            Line((x, height), (x, height + seen.mm(2.4)), "dimensions", OUTLINE),
            Line((x, depth - height), (x, depth - height - seen.mm(1.6)), "dimensions", OUTLINE),
            Arrow(
                (x, height + seen.mm(2.4)), (x - seen.mm(2.6), height + seen.mm(2.4)),
                "dimensions", LIGHT, 1.4,
            ),
            _letter(seen, letter, x, height),
        ]  # fmt: skip
    return shapes


def _letter(seen: View, letter: str, x: float, height: float) -> Text:
    """Return the letter right of its mark, or left of the arrow where an axis stands there."""
    runs: Runs = ((letter, "bold"),)
    width = seen.mm(text_width(runs, LETTER) + 0.5)
    right, left = x + seen.mm(0.9), x - seen.mm(3.2)
    crossed = any(right - seen.mm(0.5) < axis < right + width for axis in seen.outline.axes)
    y = height + seen.mm(1.6)
    if crossed:
        return Text((left, y), runs, "text", LETTER, "end")
    return Text((right, y), runs, "text", LETTER, "start")


def _spans(seen: View, floor: float) -> list[Shape]:
    """Dimension the clear lengths where they fit, then the spans between axes."""
    outline = seen.outline
    y = seen.mm(floor)
    shapes: list[Shape] = []
    for span in seen.spans:
        start, end = outline.faces(span)
        left, right = outline.axes[span - 1 : span + 1]
        for symbol in (words("clear"), ()):
            clear = Dimension((start, y), (end, y), "horizontal", -4.0, symbol, size=2.3)
            fits = text_width(clear.runs, 2.3) + FIT_MARGIN <= clear.measured * seen.scale
            if fits and (start, end) != (left, right):
                shapes.append(clear)
                break
        shapes.append(Dimension((left, y), (right, y), "horizontal", -9.5))
    return shapes


def _note_lines(seen: View, detailing: Detailing, short: Sequence[Short]) -> list[str]:
    zones = [zone for zone in detailing.stirrups if zone.span in seen.spans]
    closed = {zone.closed for zone in zones if not zone.around_hooks}
    legs = {zone.legs for zone in zones}
    forms = " and ".join("closed" if each else "open" for each in sorted(closed))
    scale = f"Dimensions in mm, scale 1 : {seen.ratio:g}."
    drawn = "Bars are drawn apart; cut lengths are rounded up to full 10 mm; ends of bars"
    lines = [f"{scale} {drawn} are dimensioned from the support axes."]
    if closed:
        count = ", ".join(map(str, sorted(legs)))
        lines.append(
            f"Stirrups: {forms}, {count} legs; number, size, spacing, mark, and the distance from "
            "the first to the last stirrup of a zone."
            if not any(zone.around_hooks for zone in zones)
            else f"Stirrups: {forms}, {count} legs: number, size, spacing, mark, first to last of "
            "a zone. Ties stand around hooks; hanger stirrups are not drawn."
        )
    return [*lines, *gap_notes(seen, short, NOTE, PAGE_WIDTH - 3.0)]


def _notes(seen: View, lines: Sequence[str], floor: float) -> list[Shape]:
    first, step = FEW_LINES if len(lines) < MANY else MANY_LINES
    return [
        Text(seen.at(1.0, floor - first - step * number), words(line), "text", NOTE, "start")
        for number, line in enumerate(lines)
    ]


def _caption(seen: View) -> str:
    if not (seen.cut_left or seen.cut_right):
        return "Elevation"
    if seen.first == seen.last:
        return f"Elevation, span {seen.first}"
    return f"Elevation, spans {seen.first} to {seen.last}"


def _alt(seen: View, detailing: Detailing, short: Sequence[Short]) -> str:
    """Say in words what the elevation shows."""
    outline = seen.outline
    parts_ = [
        f"{_caption(seen)} at 1 : {seen.ratio:g}: "
        + ", ".join(
            f"span {span} of {outline.lengths[span - 1]:.0f} mm, {outline.depths[span - 1]:.0f} mm "
            "deep"
            for span in seen.spans
        )
    ]
    low, high = seen.own
    for face in ("bottom", "top"):
        runs = [
            f"{run.mark} {run.number}-{run.size} from {fixed(run.start, 0)} to {run.end:.0f}"
            for run in detailing.bars
            if run.face == face and run.start < high and run.end > low
        ]
        if runs:
            parts_.append(f"{face} bars: {', '.join(runs)}")
    zones = [
        f"span {zone.span} {zone.number}-{zone.size} at {zone.spacing:.0f}"
        + (" (ties around hooks)" if zone.around_hooks else "")
        for zone in detailing.stirrups
        if zone.span in seen.spans
    ]
    if zones:
        parts_.append(f"stirrups: {', '.join(zones)}")
    parts_ += [
        f"span {each.span}, {each.face} bars not enough: {each.text}" for each in shown(seen, short)
    ]
    return _cut("; ".join(parts_))


LONGEST_ALT = 3900


def _cut(text: str) -> str:
    return f"{text[:LONGEST_ALT]} ..." if len(text) > LONGEST_ALT else f"{text}."
