"""Which part of a beam an elevation shows, and at what scale."""

from __future__ import annotations

import math
from dataclasses import dataclass

from lineproof.beams.continuous.layout import BeamOutline, Detailing
from lineproof.drawing import Point
from lineproof.drawing.metrics import PAGE_WIDTH

MARGIN = 4.0
SCALES = (20.0, 25.0, 40.0, 50.0, 75.0, 100.0, 125.0, 150.0, 200.0, 250.0, 300.0, 400.0, 500.0,
          600.0, 750.0, 1000.0, 1250.0, 1500.0, 2000.0, 2500.0, 5000.0, 10000.0)  # fmt: skip
SMALLEST_READABLE = 200.0
MOST_SPANS = 3
PAST_A_CUT = 0.35
"""Of the span beyond the last support shown, where no top bar asks for more."""
MOST_PAST_A_CUT = 0.45


@dataclass(frozen=True, slots=True)
class View:
    """Spans ``first`` to ``last`` of a beam between ``low`` and ``high`` along it.

    ``x`` is measured from the axis of support 1, ``y`` up from the top face, both in mm; sizes on
    paper are turned into these by :meth:`mm`.
    """

    outline: BeamOutline
    first: int
    last: int
    low: float
    high: float
    ratio: float

    @property
    def scale(self) -> float:
        """Paper over beam."""
        return 1.0 / self.ratio

    @property
    def left(self) -> float:
        """Paper left of ``low``: the drawing stands in the middle of the page."""
        return (PAGE_WIDTH - (self.high - self.low) * self.scale) / 2

    def mm(self, paper: float) -> float:
        """Length along the beam of a length on paper."""
        return paper * self.ratio

    def paper(self, x: float) -> float:
        """Place on paper of a station."""
        return self.left + (x - self.low) * self.scale

    def station(self, paper: float) -> float:
        """Station of a place on paper."""
        return self.low + self.mm(paper - self.left)

    def at(self, paper_x: float, paper_y: float) -> Point:
        """Drawing point of a place on paper, its height measured from the top face."""
        return (self.station(paper_x), self.mm(paper_y))

    @property
    def cut_left(self) -> bool:
        """Whether the beam goes on to the left."""
        return self.first > 1

    @property
    def cut_right(self) -> bool:
        """Whether the beam goes on to the right."""
        return self.last < len(self.outline.lengths)

    @property
    def spans(self) -> range:
        """Numbers of the spans shown wholly."""
        return range(self.first, self.last + 1)

    @property
    def supports(self) -> range:
        """Numbers of the supports shown."""
        return range(self.first, self.last + 2)

    @property
    def own(self) -> tuple[float, float]:
        """From the first to the last support axis shown."""
        return self.outline.axes[self.first - 1], self.outline.axes[self.last]

    @property
    def deepest(self) -> float:
        """Greatest depth shown [mm]."""
        shown = range(max(self.first - 1, 1), min(self.last + 1, len(self.outline.lengths)) + 1)
        return max(self.outline.depths[span - 1] for span in shown)


def view(outline: BeamOutline, detailing: Detailing, spans: tuple[int, int]) -> View:
    """Return the view of a row of spans on the width of the page, at a usual scale."""
    first, last = spans
    low, high = outline.ends
    if first > 1:
        low = outline.axes[first - 1] - _past(outline, detailing, first - 1, first)
    if last < len(outline.lengths):
        high = outline.axes[last] + _past(outline, detailing, last + 1, last + 1)
    room = PAGE_WIDTH - 2 * MARGIN
    ratio = next((r for r in SCALES if (high - low) / r <= room), math.ceil((high - low) / room))
    return View(outline, first, last, low, high, ratio)


def _past(outline: BeamOutline, detailing: Detailing, span: int, support: int) -> float:
    """How far into ``span`` the view goes past ``support``: to the end of its top bars."""
    axis, length = outline.axes[support - 1], outline.lengths[span - 1]
    way = 1.0 if span == support else -1.0
    reach = [
        way * ((run.end if way > 0 else run.start) - axis)
        for run in detailing.bars
        if run.face == "top" and run.start < axis < run.end
    ]
    near = [value for value in reach if value <= MOST_PAST_A_CUT * length]
    return max([PAST_A_CUT * length, *(value + 0.05 * length for value in near)])


def parts(outline: BeamOutline) -> tuple[tuple[int, int], ...]:
    """Divide the spans into rows that can be read at print size: at most three, and even."""
    count = len(outline.lengths)
    room = SMALLEST_READABLE * (PAGE_WIDTH - 2 * MARGIN)
    rows = max(math.ceil(count / MOST_SPANS), min(count, math.ceil(sum(outline.lengths) / room)))
    least, more = divmod(count, rows)
    result = []
    first = 1
    for row in range(rows):
        last = first + least + (row < more) - 1
        result.append((first, last))
        first = last + 1
    return tuple(result)
