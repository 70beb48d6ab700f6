"""Curves along a beam: axes, faces of supports, curves, and bands of values above and below."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from typing import TypeVar

from lineproof.beams.continuous.figure_rows import in_rows
from lineproof.beams.continuous.figure_support_names import SIZE as NAME
from lineproof.beams.continuous.figure_support_names import support_names
from lineproof.beams.continuous.layout import BeamOutline
from lineproof.drawing import (
    LIGHT,
    MEDIUM,
    THIN,
    Circle,
    Dash,
    Figure,
    Line,
    Point,
    Runs,
    Shape,
    Text,
    words,
)
from lineproof.drawing.axes import Axes, curve, nice_ticks, tick_texts
from lineproof.drawing.metrics import PAGE_WIDTH, text_width

LEFT, RIGHT = 17.0, 4.0
VALUE, NOTE, TICK_TEXT = 2.4, 2.6, 2.5
LINE = 3.3
SAMPLE = 11.0
_NOTE_START = 2.0
"""Where notes and samples begin [mm]."""
THICK = 1.2
THIN_LINES = "Thin lines: axes of the supports, chained; their faces and the values marked, dotted."
EXCEEDED = "The resistance is EXCEEDED where the axis is drawn thick."
MILLIMETRES = 1e-3
"""Stations are printed in m."""


@dataclass(frozen=True, slots=True)
class Curve:
    """One kind of line in pieces of (station [mm], value), told from others by its dashes."""

    name: str
    pieces: Sequence[Sequence[Point]]
    dash: Dash


@dataclass(frozen=True, slots=True)
class Mark:
    """A point of a curve with the lines of text that belong to it."""

    x: float
    y: float
    lines: tuple[Runs, ...]


@dataclass(frozen=True, slots=True)
class Along:
    """What a figure shows; ``above`` and ``below`` are marks whose texts stand in those bands."""

    spans: tuple[int, ...]
    curves: tuple[Curve, ...]
    above: tuple[Mark, ...]
    below: tuple[Mark, ...]
    label: Runs
    unit: str
    downward: bool = False
    notes: tuple[str, ...] = ()
    height: float = 58.0
    exceeded: tuple[tuple[float, float], ...] = ()
    """Stretches where the resistance is exceeded: the axis is drawn thick there."""


@dataclass(frozen=True, slots=True)
class _Band:
    """Texts of marks in rows: row and middle of each, and the height of the band."""

    marks: tuple[Mark, ...]
    places: tuple[tuple[int, float], ...]
    row: float
    height: float


Piece = TypeVar("Piece")
MOST_SPANS = 6


def in_figures(pieces: Sequence[Piece]) -> tuple[tuple[Piece, ...], ...]:
    """Divide the pieces of a long beam evenly, at most six to a figure, one a span.

    >>> in_figures([1, 2, 3, 4, 5, 6, 7])
    ((1, 2, 3, 4), (5, 6, 7))
    """
    rows = -(-len(pieces) // MOST_SPANS)
    least, more = divmod(len(pieces), max(rows, 1))
    found: list[tuple[Piece, ...]] = []
    first = 0
    for row in range(rows):
        last = first + least + (row < more)
        found.append(tuple(pieces[first:last]))
        first = last
    return tuple(found)


def along_figure(outline: BeamOutline, data: Along, caption: str) -> Figure:
    """Draw curves over the spans given, which follow one another."""
    first, last = min(data.spans), max(data.spans)
    low, high = _range(outline, first, last)
    ticks = _ticks(data)
    span = (ticks[-1], ticks[0]) if data.downward else (ticks[0], ticks[-1])
    probe = Axes(LEFT, 0.0, PAGE_WIDTH - LEFT - RIGHT, data.height, (low, high), span)
    over, under = _band(probe, data.above), _band(probe, data.below)
    legend = _legend(data)
    foot = 2.0 + LINE * len(legend) + 3.0
    bottom = foot + 8.0 + under.height
    axes = Axes(LEFT, bottom, probe.width, data.height, (low, high), span)
    head = bottom + data.height + over.height + 2.0
    shapes = [
        *_frame(axes, outline, ticks, data, bottom - under.height),
        *(Line(axes.at(a, 0.0), axes.at(b, 0.0), "curve", THICK) for a, b in data.exceeded),
        *_supports(axes, outline, range(first, last + 2), head),
        *(curve(axes, piece, each.dash) for each in data.curves for piece in each.pieces),
        *_marks(axes, over, 1.0),
        *_marks(axes, under, -1.0),
        *_draw_legend(legend, foot),
    ]
    return Figure(
        PAGE_WIDTH,
        round(head + 4.5, 1),
        1.0,
        (0.0, 0.0),
        tuple(shapes),
        _alt(data, caption),
        caption,
    )


def _range(outline: BeamOutline, first: int, last: int) -> tuple[float, float]:
    """Return the stations drawn: from the outer half of the first support to that of the last."""
    return (
        outline.axes[first - 1] - outline.supports[first - 1].half,
        outline.axes[last] + outline.supports[last].half,
    )


def _ticks(data: Along) -> tuple[float, ...]:
    values = [y for each in data.curves for piece in each.pieces for _, y in piece]
    low, high = min(0.0, *values), max(0.0, *values)
    if high - low <= 0.0:
        high = 1.0
    return nice_ticks(low, high, 6)


def _band(axes: Axes, marks: Sequence[Mark]) -> _Band:
    widths = [max(text_width(line, VALUE) for line in mark.lines) for mark in marks]
    wanted = [axes.at(mark.x, 0.0)[0] for mark in marks]
    places = in_rows(widths, wanted, LEFT - 1.0, PAGE_WIDTH - 0.5) if marks else []
    lines = max((len(mark.lines) for mark in marks), default=0)
    row = lines * LINE + 1.2
    rows = 1 + max((number for number, _ in places), default=-1)
    return _Band(tuple(marks), tuple(places), row, rows * row + (3.0 if marks else 0.0))


def _frame(
    axes: Axes, outline: BeamOutline, ticks: Sequence[float], data: Along, below: float
) -> list[Shape]:
    """Draw the grid of values, the zero line, and the stations of the axes in m below."""
    left, right = axes.left, axes.left + axes.width
    shapes: list[Shape] = []
    for tick, text in zip(ticks, tick_texts(ticks), strict=True):
        y = axes.at(0.0, tick)[1]
        shapes.append(Line((left, y), (right, y), "axes", LIGHT if tick == 0.0 else 0.08))
        shapes.append(Text((left - 1.6, y), words(text), "axes", TICK_TEXT, "end"))
    shapes.append(Line((left, axes.bottom), (left, axes.bottom + axes.height), "axes", LIGHT))
    middle = axes.bottom + axes.height / 2
    shapes.append(Text((3.0, middle), data.label, "axes", 2.8, rotation=90.0))
    first, last = min(data.spans), max(data.spans)
    stations = outline.axes[first - 1 : last + 1]
    names = [words(f"{x * MILLIMETRES:.2f}") for x in stations]
    widths = [text_width(name, TICK_TEXT) for name in names]
    wanted = [axes.at(x, 0.0)[0] for x in stations]
    places = in_rows(widths, wanted, left - 10.0, PAGE_WIDTH - 0.5)
    for name, (row, x) in zip(names, places, strict=True):
        shapes.append(Text((x, below - 2.2 - 3.0 * row), name, "axes", TICK_TEXT))
    rows = max(row for row, _ in places)
    under = below - 5.8 - 3.0 * rows
    shapes.append(Text(((left + right) / 2, under), words("distance from the axis of support 1, m"),
                       "axes", TICK_TEXT))  # fmt: skip
    return shapes


def _supports(axes: Axes, outline: BeamOutline, numbers: Sequence[int], head: float) -> list[Shape]:
    """Mark axes (chain) and faces (dotted) of supports, with their names at the head."""
    low, high = axes.bottom, axes.bottom + axes.height
    held = [number for number in numbers if outline.supports[number - 1].kind != "free"]
    middles = [axes.at(outline.axes[number - 1], 0.0)[0] for number in held]
    shapes: list[Shape] = []
    for number in numbers:
        x, half = outline.axes[number - 1], outline.supports[number - 1].half
        for station in [] if half == 0.0 else [x - half, x + half]:
            if axes.x_range[0] <= station <= axes.x_range[1]:
                at = axes.at(station, 0.0)[0]
                shapes.append(Line((at, low), (at, high), "centre", THIN, "dotted"))
        at = axes.at(x, 0.0)[0]
        shapes.append(Line((at, low), (at, high), "centre", THIN, "chain"))
    shapes += [
        Text((x, head + 2.0), name, "centre", NAME)
        for name, x in support_names(held, middles, 1.0, PAGE_WIDTH - 0.5)
    ]
    return shapes


def _marks(axes: Axes, band: _Band, way: float) -> list[Shape]:
    """Draw a dot at each mark, a thin line to its band, and its texts there."""
    edge = axes.bottom + (axes.height if way > 0.0 else 0.0)
    shapes: list[Shape] = []
    for mark, (row, x) in zip(band.marks, band.places, strict=True):
        point = axes.at(mark.x, mark.y)
        near = edge + way * (1.6 + row * band.row)
        shapes.append(Circle(point, 0.6, "curve"))
        shapes.append(Line(point, (point[0], edge), "dimensions", THIN, "dotted"))
        shapes.append(Line((point[0], edge), (x, near), "dimensions", THIN))
        ordered = mark.lines if way < 0.0 else tuple(reversed(mark.lines))
        for number, line in enumerate(ordered):
            y = near + way * (1.6 + number * LINE)
            shapes.append(Text((x, y), line, "text", VALUE))
    return shapes


def _legend(data: Along) -> list[tuple[str, Dash | None]]:
    lines: list[tuple[str, Dash | None]] = [(each.name, each.dash) for each in data.curves]
    notes = [THIN_LINES, *data.notes, *([EXCEEDED] if data.exceeded else [])]
    return lines + [(line, None) for note in notes for line in _wrapped(note)]


def _wrapped(note: str) -> list[str]:
    """Return a note in lines that fit on the page."""
    lines = [""]
    for word in note.split():
        longer = f"{lines[-1]} {word}".strip()
        fits = _NOTE_START + text_width(words(longer), NOTE) <= PAGE_WIDTH
        lines = [*lines[:-1], longer] if fits else [*lines, word]
    return lines


def _draw_legend(legend: Sequence[tuple[str, Dash | None]], top: float) -> list[Shape]:
    shapes: list[Shape] = []
    for number, (text, dash) in enumerate(legend):
        y = top - 2.0 - number * LINE
        start = _NOTE_START
        if dash is not None:
            shapes.append(Line((start, y), (start + SAMPLE, y), "curve", MEDIUM, dash))
            start += SAMPLE + 2.0
        shapes.append(Text((start, y), words(text), "text", NOTE, "start"))
    return shapes


def _alt(data: Along, caption: str) -> str:
    """Say in words which values are marked."""
    marks = [*data.above, *data.below]
    values = "; ".join(
        f"at {mark.x:.0f} mm "
        + ", ".join("".join(text for text, _ in line) for line in mark.lines)
        + f" {data.unit}"
        for mark in sorted(marks, key=lambda mark: mark.x)
    )
    curves = ", ".join(each.name for each in data.curves)
    text = f"{caption}: {curves}. {values}."
    for low, high in data.exceeded:
        text += f" Resistance exceeded from {low:.0f} to {high:.0f} mm."
    longest = 3900
    return text if len(text) <= longest else f"{text[:longest]} ..."
