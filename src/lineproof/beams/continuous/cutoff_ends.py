"""The ends of bars as laid, read from the runs alone: cut, in a support, past inflection."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass

import numpy as np

from lineproof.beams.continuous.cutoff import distance, far_face, half_of, local, sag_at
from lineproof.beams.continuous.detailing_data import Designed
from lineproof.beams.continuous.forces import End, other
from lineproof.beams.continuous.layout import BarRun, Face
from lineproof.beams.continuous.resistance import alike, in_line, lapped
from lineproof.beams.continuous.resistance_demand import NOTHING

Runs = tuple[BarRun, ...]


@dataclass(frozen=True, slots=True)
class Ending:
    """Bars of one section that end at one distance ``t`` from the near axis."""

    t: float
    runs: Runs


@dataclass(frozen=True, slots=True)
class SideOf:
    """The bars of one section towards one end: below a span, or above a support.

    ``near`` names the support by its side of the span. ``runs`` are all bars of the section,
    ``cuts`` those that end within the span before the support (top: before the longest), first
    the ones that end first, ``kept`` the others: they run in, or reach furthest; ``t_kept`` is
    the shortest reach of these.
    """

    face: Face
    span: int
    near: End
    runs: Runs
    cuts: tuple[Ending, ...]
    kept: Runs
    t_kept: float

    def continuing(self, index: int) -> Runs:
        """Return the bars that go on past a cut."""
        later = [run for ending in self.cuts[index + 1 :] for run in ending.runs]
        return (*later, *self.kept)

    def t_continuing(self, index: int) -> float:
        """Return where the first of the continuing bars ends."""
        return self.cuts[index + 1].t if index + 1 < len(self.cuts) else self.t_kept


def whole(runs: Iterable[BarRun], run: BarRun, towards: End) -> BarRun:
    """Return the last of the like bars that a run is lapped with, one after the other."""
    kept = tuple(runs)
    for _ in kept:
        following = [r for r in kept if (lapped(run, r) if towards == "right" else lapped(r, run))]
        if not following:
            break
        run = following[0]
    return run


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
    return tuple(run for run in there if not any(_beside(run, other, x) for other in there))


def _beside(run: BarRun, mate: BarRun, x: float) -> bool:
    """Tell whether a run only accompanies another one, with which it is lapped, at a place."""
    if alike(run, mate):
        return lapped(mate, run)
    if in_line(mate, run):
        return x - run.start < mate.end - x
    return in_line(run, mate) and run.end - x < x - mate.start


def bottom_side(designed: Designed, runs: Runs, span: int, near: End) -> SideOf:
    """Return how the bottom bars of a span end towards a support."""
    there = at_section(runs, "bottom", sag_at(designed, span))
    tips = [(distance(designed, span, near, tip(whole(runs, r, near), near)), r) for r in there]
    half = half_of(designed, span, near)
    inside = [(t, r) for t, r in tips if t <= half]
    cut = sorted({t for t, _ in tips if t > half}, reverse=True)
    endings = tuple(Ending(t, tuple(r for s, r in tips if s == t)) for t in cut)
    kept = tuple(r for _, r in inside)
    return SideOf(
        "bottom", span, near, there, endings, kept, max((t for t, _ in inside), default=half)
    )


def top_side(designed: Designed, runs: Runs, support: int, side: End) -> SideOf:
    """Return how the top bars of a support end in the span on one side of it."""
    span, near = (support - 1, other(side)) if side == "left" else (support, other(side))
    axis = designed.outline.axes[support - 1]
    there = at_section(runs, "top", _inside(designed, support, axis))
    tips = [(distance(designed, span, near, tip(whole(runs, r, side), side)), r) for r in there]
    ends = sorted({t for t, _ in tips})
    endings = tuple(Ending(t, tuple(r for s, r in tips if s == t)) for t in ends[:-1])
    kept = tuple(r for t, r in tips if t == ends[-1]) if ends else ()
    return SideOf("top", span, near, there, endings, kept, ends[-1] if ends else 0.0)


def _inside(designed: Designed, support: int, axis: float) -> float:
    """Return where the bars of a support are read: its axis, at an end support its inner face."""
    half = designed.outline.supports[support - 1].half
    if support == 1:
        return axis + half
    return axis - half if support == len(designed.outline.supports) else axis


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


def inflection(designed: Designed, span: int, near: End, count: int = 101) -> Inflection | None:
    """Return the point of inflection near a support with the largest shear, on a whole mm.

    None where no case bends the beam the other way at that support.
    """
    t = np.linspace(half_of(designed, span, near), far_face(designed, span, near), count)
    x = t if near == "left" else designed.outline.lengths[span - 1] - t
    M, V = designed.forces.along(span, x)
    found: list[Inflection] = []
    turns = (M[:, :-1] <= NOTHING) & (M[:, 1:] > NOTHING)
    for row, at in zip(*np.nonzero(turns), strict=True):
        below, above = M[row, at], M[row, at + 1]
        part = float(-min(below, 0.0) / (above - min(below, 0.0)))
        place = round(float(t[at] + part * (t[at + 1] - t[at])))
        found.append(Inflection(float(place), int(row), abs(float(V[row, at]))))
    if not found:
        return None
    most = max(found, key=lambda point: point.V)
    _, V_there = designed.forces.pairs(span, local(designed, span, near, most.t))
    return Inflection(most.t, most.row, abs(float(V_there[most.row])))
