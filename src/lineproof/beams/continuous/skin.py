"""Skin reinforcement of deep beams (10.6.2) along the beam: the bars of the side faces.

A strip reaches to half the depth, in the span from below, at a support from above. So the bars
stand evenly over the whole side, as close as the strip that asks for most lets them. The side
begins below the slab: of a strip at a support the slab takes a part, in which no skin bars stand.
"""

from __future__ import annotations

import math
from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from itertools import pairwise

from lineproof.beams.continuous.anchorage import Bar, develop
from lineproof.beams.continuous.detailing_data import STOCK, Designed
from lineproof.beams.continuous.forces import End
from lineproof.beams.continuous.layout import BarRun, Face
from lineproof.beams.continuous.numbers import Numbers, holds, put
from lineproof.beams.continuous.resistance import section_depth
from lineproof.beams.cracks import (
    SKIN_BAR,
    bars_each_face,
    exposure_kind,
    record_skin_area,
    record_skin_bars,
)
from lineproof.beams.steps import Steps
from lineproof.standards.a23_3 import crack_control as clause
from lineproof.standards.a23_3.bars import BARS

SIDES = 2
STEP = 50.0
"""Lengths of skin bars are steps of this [mm]."""


@dataclass(frozen=True, slots=True)
class SideBars:
    """Bars of one size at each side face, evenly over the ``side`` between the outer layers."""

    size: str
    each: int
    side: Side

    def within(self, strip: float, face: Face) -> int:
        """Return how many at each side face stand in a strip of that height [mm] at a face."""
        counted = self.side.counted(strip, face) * (self.each + 1) / self.side.height
        return math.floor(counted * (1 + 1e-12))


@dataclass(frozen=True, slots=True)
class Side:
    """The side of a span ``h`` deep: it begins ``below`` from the bottom, ``above`` from the top.

    mm. From below it begins within the stirrup, from above there or below the slab.
    """

    h: float
    below: float
    above: float

    @property
    def height(self) -> float:
        """Height over which the bars stand evenly."""
        return self.h - self.below - self.above

    def counted(self, strip: float, face: Face) -> float:
        """Return the height of a strip at a face in which bars can stand: to half the depth."""
        begins = self.below if face == "bottom" else self.above
        return max(min(strip, self.h / 2 - begins), 0.0)


def side_of(designed: Designed, span: int) -> Side:
    """Return the side of a span between the outer layers, below the slab."""
    outline = designed.outline
    inset = outline.cover + BARS.number(designed.basis.stirrups.size, "d_b")
    return Side(outline.depths[span - 1], inset, max(inset, outline.h_f))


def stretch_of(designed: Designed, span: int, near: End | None) -> tuple[float, float]:
    """Return the stretch of a span with a strip in tension, along the beam [mm].

    From below it is the clear length, from above a quarter of it at the ``near`` end, of a
    cantilever half of it.
    """
    start, end = designed.outline.faces(span)
    if near is None:
        return start, end
    reach = (end - start) * (0.5 if designed.cantilever(span) else 0.25)
    return (start, start + reach) if near == "left" else (end - reach, end)


def side_bars(
    designed: Designed, runs: Sequence[BarRun], span: int, stretch: tuple[float, float]
) -> SideBars:
    """Return the bars of the side faces where fewest stand along a stretch; none: 0 each."""
    start, end = stretch
    tips = {x for r in runs if r.place == "side face" for x in (r.start, r.end) if start < x < end}
    middles = [(a + b) / 2 for a, b in pairwise(sorted({start, end} | tips))]
    found = (_side_bars_at(designed, runs, span, x) for x in (start, *middles, end))
    return min(found, key=lambda side: side.each)


def _side_bars_at(designed: Designed, runs: Sequence[BarRun], span: int, x: float) -> SideBars:
    """Return the bars of the side faces that stand at a place along the beam; none: 0 each.

    Of runs that are lapped there the larger number counts.
    """
    there = [r for r in runs if r.place == "side face" and r.start <= x <= r.end]
    thin = min(there, key=lambda run: run.diameter, default=None)
    kept: list[BarRun] = []
    for run in sorted(there, key=lambda run: -run.number):
        if not any(_lapped(run, other) for other in kept):
            kept.append(run)
    each = sum(run.number for run in kept) // SIDES
    return SideBars(thin.size if thin else SKIN_BAR, each, side_of(designed, span))


def _lapped(run: BarRun, other: BarRun) -> bool:
    """Tell whether one of two runs goes on where the other ends."""
    first, second = sorted((run, other), key=lambda each: each.start)
    return first.start < second.start and first.end < second.end


def record_skin(steps: Steps, exposure: str, side: SideBars, face: Face) -> None:
    """Record inside the open part the skin reinforcement of a section with the bars there.

    ``face`` is the one in tension.
    """
    A_bk = record_skin_area(steps, exposure, side.size)
    within = side.within(float(steps.entry("h_sk").value), face)
    source = "somewhere along it none stand at the side faces"
    if side.each:
        source = f"{side.each} at each face where fewest stand, evenly over the side; in the strip"
    record_skin_bars(steps, A_bk, within, source)


def skin_runs(designed: Designed, exposure: str) -> tuple[BarRun, ...]:
    """Return the skin bars of all deep spans, lapped where they are longer than the stock."""
    made: list[BarRun] = []
    for span in range(1, len(designed.outline.lengths) + 1):
        each = _each_face(designed, exposure, span)
        if each:
            made += _along(designed, span, SIDES * each)
    return tuple(made)


def _each_face(designed: Designed, exposure: str, span: int) -> int:
    """Return how many bars stand over the whole side of a span at each face; 0: not deep."""
    h = designed.outline.depths[span - 1]
    if not holds(clause.NEEDS_SKIN, {"h": h}):
        return 0
    A_b = BARS.number(SKIN_BAR, "A_b")
    spacings, side = [], side_of(designed, span)
    for face, d in _depths(designed, span):
        at: Numbers = {
            "h": h, "d": d, "b_w": designed.outline.b_w, "c_c": designed.outline.cover,
            "d_bs": BARS.number(designed.basis.stirrups.size, "d_b"),
            "d_b": BARS.number(SKIN_BAR, "d_b"),
            "rho_sk": clause.LIMITS.number(exposure_kind(exposure), "rho_sk"),
        }  # fmt: skip
        put(at, clause.SKIN_DEPTH, clause.SKIN_HEIGHT, clause.SKIN_WIDTH, clause.SKIN_STRIPS)
        put(at, clause.SKIN_AREA)
        height = side.counted(at["h_sk"], face)
        if height > 0:
            spacings.append(height / bars_each_face(at["A_sk"], at["h_sk"], A_b))
    gaps = side.height / min(spacings, default=clause.SKIN_SPACING_MOST)
    return max(math.ceil(gaps * (1 - 1e-12)) - 1, 1)


def _depths(designed: Designed, span: int) -> Iterator[tuple[Face, float]]:
    """Give the sections of a span whose tension face has a strip: that face, and their depth."""
    if not designed.cantilever(span):
        yield "bottom", section_depth(designed, "bottom", span)
    for support in (span, span + 1):
        if designed.held(support) and designed.bars.top[support - 1].web:
            yield "top", section_depth(designed, "top", span, support)


def _along(designed: Designed, span: int, number: int) -> Iterator[BarRun]:
    """Give the skin bars of a span, lapped at inner supports and where they exceed the stock."""
    outline, last = designed.outline, len(designed.outline.lengths)
    size = Bar("top", "web", 1, SKIN_BAR, SIDES, outline.depths[span - 1])
    lap = math.ceil(develop(designed.basis, size).lap / STEP) * STEP
    low, high = outline.ends
    start = low + designed.end_cover if span == 1 else outline.axes[span - 1] - lap / 2
    end = high - designed.end_cover if span == last else outline.axes[span] + lap / 2
    pieces = max(math.ceil((end - start - lap) / (STOCK - lap)), 1)
    step = (end - start - lap) / pieces
    for piece in range(pieces):
        first = start + piece * step
        yield BarRun(
            "bottom", 1, number, SKIN_BAR, first, first + step + lap, "side face",
            serves=f"skin of span {span}",
        )  # fmt: skip
