"""Bars that stand side by side in a layer: how many, and where the layer is tightest."""

from __future__ import annotations

import math
from collections.abc import Iterable, Iterator, Sequence
from dataclasses import dataclass
from itertools import pairwise

from lineproof.beams.bars import BarLayer, spaced
from lineproof.beams.continuous.anchorage import Bar, clear_distance, value
from lineproof.beams.continuous.detailing_data import Basis, Designed
from lineproof.beams.continuous.layout import BarRun
from lineproof.beams.continuous.resistance import PAIR, depth_of, lap_pairs
from lineproof.standards.a23_3 import bars as bar_clause

NEAR = 1e-6
"""Round-off of a distance [mm]."""


@dataclass(frozen=True, slots=True)
class Row:
    """The bars of one layer of the web that stand between two places along the beam [mm].

    Of two bars that are lapped there one counts: ``mates`` are the others.
    """

    start: float
    end: float
    runs: tuple[BarRun, ...]
    mates: tuple[BarRun, ...]

    @property
    def number(self) -> int:
        """Number of bars side by side, two that are lapped as one."""
        return sum(run.number for run in self.runs)

    @property
    def lapped(self) -> int:
        """Number of bars that are lapped with another one there."""
        return sum(run.number for run in self.mates)

    @property
    def thickest(self) -> BarRun:
        """A run of the thickest bars."""
        return max((*self.runs, *self.mates), key=lambda run: run.diameter)

    @property
    def all_corners(self) -> bool:
        """Whether the lapped bars are the two in the corners, with others between them."""
        return self.lapped <= PAIR < self.number


def rows_of(runs: Iterable[BarRun], start: float, end: float) -> Iterator[Row]:
    """Give the rows of bars of one layer at all places between two ends, from left to right."""
    kept = [run for run in runs if run.start < end and run.end > start]
    inside = {x for run in kept for x in (run.start, run.end) if start < x < end}
    for a, b in pairwise(sorted({start, end} | inside)):
        there = [run for run in kept if run.start <= a and run.end >= b]
        second = {j for _, j in lap_pairs(there)}
        single = tuple(run for i, run in enumerate(there) if i not in second)
        if there:
            yield Row(a, b, single, tuple(there[j] for j in sorted(second)))


def tightest(basis: Basis, runs: Iterable[BarRun], start: float, end: float) -> Row:
    """Return the row of a layer that leaves the least clear distance beyond the least allowed.

    Raises :class:`ValueError` where none of the bars stand.
    """
    return min(rows_of(runs, start, end), key=lambda row: _spare(basis, row))


def _spare(basis: Basis, row: Row) -> tuple[float, int]:
    """Return by how much the clear distance is more than the least [mm], then the laps."""
    return spare(basis, row.thickest, row.number), -row.lapped


def spare(basis: Basis, bar: BarRun | BarLayer, number: int) -> float:
    """Return by how much the clear distance of bars in the web is more than the least [mm].

    All have the size of ``bar``; one bar alone is taken as one of two.
    """
    row = Bar("bottom", "web", 1, bar.size, spaced(number), 0.0)  # alike at either face
    least = value(bar_clause.LEAST_CLEAR, d_b=bar.diameter, a_max=basis.strengths.a_max)
    return clear_distance(basis, row) - least


def crowded(designed: Designed, runs: Sequence[BarRun]) -> list[Row]:
    """Return the rows, beside laps, that are tighter than the sections of their layer.

    They stand where bars of two spans or supports pass each other.
    """
    made = []
    for layer in layers_of(designed, runs):
        start, end = min(run.start for run in layer), max(run.end for run in layer)
        rows = [row for row in rows_of(layer, start, end) if not row.mates]
        row = min(rows, key=lambda row: _spare(designed.basis, row))
        shown = [spare(designed.basis, each, each.count) for each in _sections(designed, layer[0])]
        if spare(designed.basis, row.thickest, row.number) < min(shown, default=math.inf) - NEAR:
            made.append(row)
    return made


def _sections(designed: Designed, run: BarRun) -> list[BarLayer]:
    """Return the layers of the sections at the face and in the layer of a run."""
    tops = [top.web for top in designed.bars.top]
    rows = designed.bars.bottom if run.face == "bottom" else tops
    held = [BarLayer(PAIR, designed.bars.holders)] if run.face == "top" else []
    return [row[run.layer - 1] for row in rows if len(row) >= run.layer] + held


def layers_of(designed: Designed, runs: Sequence[BarRun]) -> list[list[BarRun]]:
    """Return the bars of the web in layers; bottom bars of other depths are other layers."""
    made: dict[tuple[str, int, float], list[BarRun]] = {}
    for run in runs:
        if run.place == "web":
            depth = depth_of(designed.outline, run) if run.face == "bottom" else 0.0
            made.setdefault((run.face, run.layer, depth), []).append(run)
    return [made[key] for key in sorted(made)]


def layer_with(designed: Designed, runs: Sequence[BarRun], run: BarRun) -> list[BarRun]:
    """Return the bars of the layer of a run; those of the overhangs where it stands there."""
    if run.place != "web":
        return [other for other in runs if (other.face, other.place) == (run.face, run.place)]
    return next(layer for layer in layers_of(designed, runs) if run in layer)
