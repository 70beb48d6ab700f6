"""The ends of bars as laid, read from the runs alone: cut, in a support, past inflection."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from dataclasses import dataclass, replace
from itertools import pairwise

import numpy as np

from lineproof.beams.continuous.anchorage import development_length, value
from lineproof.beams.continuous.cutoff import (
    along,
    depths,
    distance,
    far_face,
    full_moment,
    half_of,
    local,
    sag_at,
)
from lineproof.beams.continuous.detailing_data import Designed
from lineproof.beams.continuous.forces import End, other
from lineproof.beams.continuous.layout import BarRun, BeamOutline, Face
from lineproof.beams.continuous.resistance import alike, lap_pairs, lapped, level_pairs
from lineproof.beams.continuous.resistance_demand import NOTHING
from lineproof.standards.a23_3 import cutoff as clause

Runs = tuple[BarRun, ...]
_INSIDE = 1.0
"""How far inside the face of a support its bars are looked at [mm]."""


@dataclass(frozen=True, slots=True)
class Ending:
    """Bars of one section that end at one distance ``t`` [mm] from the near axis."""

    t: float
    runs: Runs


@dataclass(frozen=True, slots=True)
class SideOf:
    """The bars of one section towards one end: below a span, or above a support.

    ``near`` names the support by its side of the span. ``runs`` are all bars of the section.
    ``cuts`` are those that end within the span before the support (top: before the longest and
    before the far support), first the ones that end first; ``kept`` the others, which run in or
    reach furthest, and ``t_kept`` the shortest reach of these. ``met`` are those of ``kept`` that
    end beside bars of the next support.
    """

    face: Face
    span: int
    near: End
    runs: Runs
    cuts: tuple[Ending, ...]
    kept: Runs
    t_kept: float
    met: Runs = ()

    def continuing(self, index: int) -> Runs:
        """Return the bars that go on past a cut."""
        later = [run for ending in self.cuts[index + 1 :] for run in ending.runs]
        return (*later, *self.kept)

    def t_continuing(self, index: int) -> float:
        """Return where the first of the continuing bars ends."""
        return self.cuts[index + 1].t if index + 1 < len(self.cuts) else self.t_kept


def whole(designed: Designed, runs: Iterable[BarRun], run: BarRun, towards: End) -> BarRun:
    """Return the last of the like bars that a run is lapped with, one after the other."""
    kept = tuple(each for each in runs if alike(each, run))
    pairs = level_pairs(designed.outline, kept, lapped)
    after = dict(pairs) if towards == "right" else {j: i for i, j in pairs}
    index = next((i for i, each in enumerate(kept) if each is run), -1)
    while index in after:
        index = after[index]
    return run if index < 0 else kept[index]


def tip(run: BarRun, towards: End) -> float:
    """Return the end of a run towards one side."""
    return run.start if towards == "left" else run.end


def at_section(runs: Iterable[BarRun], face: Face, x: float) -> Runs:
    """Return the bars of a face that stand at a place; of two that are lapped there, one.

    Of like bars it is the first, of others the one whose end in the lap is further away.
    """
    there = [
        run
        for run in runs
        if run.face == face and run.place != "side face" and run.start < x < run.end
    ]
    aside = {_beside(there[i], there[j], i, j, x) for i, j in lap_pairs(there)}
    return tuple(run for index, run in enumerate(there) if index not in aside)


def _beside(first: BarRun, second: BarRun, i: int, j: int, x: float) -> int:
    """Return which of two lapped runs, by its place, only accompanies the other one at x."""
    if alike(first, second):
        return j
    return j if x - second.start < first.end - x else i


def bottom_side(designed: Designed, runs: Runs, span: int, near: End) -> SideOf:
    """Return how the bottom bars of a span end towards a support.

    The bars are those of the largest moment; where none stand there, the nearest on this side.
    """
    there = _bottom_bars(designed, runs, span, near)
    tips = [
        (distance(designed, span, near, tip(whole(designed, runs, r, near), near)), r)
        for r in there
    ]
    half = half_of(designed, span, near)
    inside = [(t, r) for t, r in tips if t <= half]
    cut = sorted({t for t, _ in tips if t > half}, reverse=True)
    endings = tuple(Ending(t, tuple(r for s, r in tips if s == t)) for t in cut)
    kept = tuple(r for _, r in inside)
    return SideOf(
        "bottom", span, near, there, endings, kept, max((t for t, _ in inside), default=half)
    )


def _bottom_bars(designed: Designed, runs: Runs, span: int, near: End) -> Runs:
    at = sag_at(designed, span)
    there = at_section(runs, "bottom", at)
    if there:
        return there
    start, end = designed.outline.faces(span)
    own = tuple(run for run in runs if _belongs(designed, run, span))
    low, high = (start, at) if near == "left" else (at, end)
    ends = {low, high, *(x for r in own for x in (r.start, r.end) if low < x < high)}
    stretches = sorted(pairwise(sorted(ends)), reverse=near == "left")  # the nearest first
    found = (at_section(own, "bottom", (a + b) / 2) for a, b in stretches)
    return next((met for met in found if met), ())


def _belongs(designed: Designed, run: BarRun, span: int) -> bool:
    """Tell whether a run stands in a span with its development length or more."""
    start, end = designed.outline.faces(span)
    length = min(run.end, end) - max(run.start, start)
    return length > 0 and length >= development_length(designed, run)


def at_support(designed: Designed, runs: Runs, side: SideOf) -> SideOf:
    """Return a side of bottom bars with those that stand at the face of the support as kept.

    Past a gap they are others than those of the section, of which some may run on as well.
    """
    near, half = side.near, half_of(designed, side.span, side.near)
    own = [run for run in runs if _belongs(designed, run, side.span)]
    there = at_section(own, "bottom", along(designed, side.span, near, half + _INSIDE))
    last = [(whole(designed, runs, run, near), run) for run in there]
    tips = [(distance(designed, side.span, near, tip(end, near)), run) for end, run in last]
    inside = [(t, r) for t, r in tips if t <= half]
    t_kept = max((t for t, _ in inside), default=half)
    return replace(side, cuts=(), kept=tuple(r for _, r in inside), t_kept=t_kept)


def top_side(designed: Designed, runs: Runs, support: int, side: End) -> SideOf:
    """Return how the top bars of a support end in the span on one side of it."""
    span, near = (support - 1, other(side)) if side == "left" else (support, other(side))
    there = at_section(runs, "top", top_section(designed.outline, support))
    tips = [
        (distance(designed, span, near, tip(whole(designed, runs, r, side), side)), r)
        for r in there
    ]
    far = far_face(designed, span, near)
    most = min(max((t for t, _ in tips), default=0.0), far)
    others = [run for run in runs if run.face == "top" and not _one_with(run, there)]
    met = {t for t, _ in tips if t < most and _met(designed, others, span, near, t)}
    ends = sorted({t for t, _ in tips if t < most} - met)
    endings = tuple(Ending(t, tuple(r for s, r in tips if s == t)) for t in ends)
    kept = tuple(r for t, r in tips if t >= most or t in met)
    t_kept = min((t for t, _ in tips if t >= most), default=0.0)
    beside = tuple(r for t, r in tips if t in met)
    return SideOf("top", span, near, there, endings, kept, t_kept, beside)


def _one_with(run: BarRun, there: Runs) -> bool:
    """Tell whether a run is one of some bars or lapped with them, like bars in line."""
    return any(run is r or lapped(run, r) or lapped(r, run) for r in there)


def _met(designed: Designed, others: Iterable[BarRun], span: int, near: End, t: float) -> bool:
    """Tell whether bars that end past midspan meet others there, of the next support.

    Such bars are not cut: those of both supports carry the span together, as the coverage shows.
    """
    length = designed.outline.lengths[span - 1]
    far = other(near)
    return t > length / 2 and any(
        distance(designed, span, near, tip(run, near)) < t
        and distance(designed, span, near, tip(run, far)) >= length
        for run in others
    )


def top_section(outline: BeamOutline, support: int) -> float:
    """Return where the top bars of a support are counted, from the axis of support 1 [mm].

    At its axis, at an end support at its inner face.
    """
    axis, half = outline.axes[support - 1], outline.supports[support - 1].half
    if support == 1:
        return axis + half
    return axis - half if support == len(outline.supports) else axis


def passes(designed: Designed, side: SideOf) -> bool:
    """Tell whether the longest top bars run through the span, without an end that matters."""
    if designed.cantilever(side.span):
        return True
    return side.t_kept >= far_face(designed, side.span, side.near)


@dataclass(frozen=True, slots=True)
class Inflection:
    """A point of inflection: distance from the near axis, the case, its shear [N]."""

    t: float
    row: int
    V: float


def inflections(
    designed: Designed, span: int, near: End, count: int = 101
) -> tuple[Inflection, ...]:
    """Return the points of inflection near a support that can govern, on whole mm.

    Those with the largest shear first; a case with less shear counts where its point is nearer
    to the support. None where no case bends the beam the other way at that support.
    """
    t = np.linspace(half_of(designed, span, near), far_face(designed, span, near), count)
    M = designed.forces.moments(span, local(designed, span, near, t))
    rows, at = np.nonzero((M[:, :-1] <= NOTHING) & (M[:, 1:] > NOTHING))
    below, above = np.minimum(M[rows, at], 0.0), M[rows, at + 1]
    places = np.round(t[at] - below / (above - below) * (t[at + 1] - t[at]))
    stations, station = np.unique(places, return_inverse=True)
    V = np.abs(designed.forces.shears(span, local(designed, span, near, stations), near))
    found = (
        Inflection(float(place), int(row), float(V[row, column]))
        for row, place, column in zip(rows, places, station, strict=True)
    )
    kept: list[Inflection] = []
    for point in sorted(found, key=lambda point: (-round(point.V), point.t)):
        if not kept or point.t < kept[-1].t:
            kept.append(point)
    return tuple(kept)


@dataclass(frozen=True, slots=True)
class AtInflection:
    """The point of inflection that allows the shortest development, and that length [mm]."""

    point: Inflection
    longest: float


def governing_inflection(
    designed: Designed, span: int, near: End, inside: Sequence[BarRun], t_end: float
) -> AtInflection | None:
    """Return the point of inflection near a support that governs 12.11.3 for bottom bars.

    ``inside`` run into the support and end ``t_end`` [mm] from its axis. None where there is no
    point of inflection.
    """
    points = inflections(designed, span, near)
    if not points:
        return None
    d_b = max(run.diameter for run in inside)
    d, _ = depths(designed, "bottom", span, near)
    M_r = full_moment(designed, "bottom", span, inside)
    limits = []
    for point in points:
        l_ext = value(clause.PAST_INWARD, x_t=point.t, x_e=t_end)
        l_a = value(clause.PAST_INFLECTION, l_ext=l_ext, d=d, d_b=d_b)
        limits.append(AtInflection(point, value(clause.LIMIT, M_r=M_r, V_f=point.V, l_a=l_a)))
    return min(limits, key=lambda limit: round(limit.longest, 3))


def held_at_zero(
    designed: Designed, span: int, near: End, inside: Sequence[BarRun], t_end: float
) -> bool:
    """Tell whether bottom bars are developed by 12.11.3 at the point of inflection near a support.

    ``inside`` run into the support and end ``t_end`` [mm] from its axis.
    """
    found = governing_inflection(designed, span, near, inside, t_end)
    if found is None:
        return True
    lengths = (development_length(designed, replace(run, start=0.0, end=1.0)) for run in inside)
    return max(lengths) <= found.longest
