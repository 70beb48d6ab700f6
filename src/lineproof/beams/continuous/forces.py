"""Moments and shears of every load case of a beam, at any station, with the case that governs.

Sign convention as in ``analysis.curves``: x from the left axis of the span, loads positive
downward, M positive where the bottom is in tension, V = dM/dx. N and mm.
"""

from __future__ import annotations

from collections.abc import Iterable, Mapping, Sequence
from dataclasses import dataclass
from functools import cached_property
from typing import Literal

import numpy as np

from lineproof.beams.analysis.arrangements import (
    Arrangement,
    Cases,
    Combination,
    LoadCase,
    cases_of,
    factored_combinations,
    standard_arrangements,
)
from lineproof.beams.analysis.curves import Floats, Side
from lineproof.beams.analysis.envelope import CaseSolution
from lineproof.beams.analysis.model import Beam, Load
from lineproof.beams.analysis.redistribution import MOST, redistribute
from lineproof.beams.analysis.solve import Row, Solution, solve

End = Literal["left", "right"]
"""An end of a span: the one at its left or at its right support."""
ENDS: tuple[End, End] = ("left", "right")


@dataclass(frozen=True, slots=True)
class Demand:
    """Moment [N.mm] and shear [N] of one load case at one place, as a concurrent pair.

    ``x`` [mm] is measured from the left axis of the span; ``row`` is the place of the case in
    ``Forces.cases``.
    """

    span: int
    x: float
    side: Side
    row: int
    case: LoadCase
    M: float
    V: float


@dataclass(frozen=True, eq=False)
class Forces:
    """A solved beam with all its load cases.

    ``solution`` has one row a load type and span, ``factors`` (cases, rows) makes the cases.
    ``reductions`` are support numbers with the part [%] by which every case's moment there is
    reduced (9.2.4).
    """

    beam: Beam
    loads: tuple[Load, ...]
    solution: Solution
    cases: tuple[LoadCase, ...]
    factors: Floats
    reductions: tuple[tuple[int, float], ...] = ()

    @classmethod
    def of(
        cls,
        beam: Beam,
        loads: Iterable[Load],
        combinations: Sequence[Combination] | None = None,
        arrangements: Sequence[Arrangement] | None = None,
        reductions: Mapping[int, float] | None = None,
    ) -> Forces:
        """Solve a beam for its loads; by default all strength combinations and arrangements.

        ``reductions`` are made within the most that 9.2.4 allows any section; whether a section
        allows it is a check of its own.

        Raises :class:`UserError` with every fault of beam and loads.
        """
        kept = tuple(loads)
        solution = solve(beam, kept)
        kinds = tuple(dict.fromkeys(kind for kind, _ in solution.rows))
        if combinations is None:
            combinations = factored_combinations(kinds)
        if arrangements is None:
            arrangements = all_placements(len(beam.spans))
        made: Cases = cases_of(solution.rows, combinations, arrangements)
        chosen = tuple((reductions or {}).items())
        return cls(beam, kept, solution, made.names, made.factors, chosen)

    def under(self, combinations: Sequence[Combination]) -> Forces:
        """Return the forces of other combinations of the same loads, moments not redistributed."""
        arrangements = all_placements(len(self.beam.spans))
        made = cases_of(self.solution.rows, combinations, arrangements)
        return Forces(self.beam, self.loads, self.solution, made.names, made.factors)

    @cached_property
    def solved(self) -> CaseSolution:
        """The solution of every case."""
        elastic = CaseSolution(self.solution.combined(self.factors), self.cases)
        if not self.reductions:
            return elastic
        reductions = dict(self.reductions)
        return redistribute(elastic, reductions, dict.fromkeys(reductions, MOST))

    def pairs(self, span: int, x: float, side: Side = "right") -> tuple[Floats, Floats]:
        """Return M [N.mm] and V [N] of every case at one station (cases,), concurrent."""
        curves = self.solved.solution.span(span)
        at = np.array([x])
        return curves.moment(at)[:, 0], curves.shear(at, side)[:, 0]

    def along(self, span: int, x: Floats, side: Side = "right") -> tuple[Floats, Floats]:
        """Return M and V of every case at stations x: (cases, stations)."""
        return self.moments(span, x), self.shears(span, x, side)

    def moments(self, span: int, x: Floats) -> Floats:
        """Return M of every case at stations x: (cases, stations)."""
        return self.solved.solution.span(span).moment(x)

    def shears(self, span: int, x: Floats, side: Side = "right") -> Floats:
        """Return V of every case at stations x: (cases, stations)."""
        return self.solved.solution.span(span).shear(x, side)

    def demand(self, span: int, x: float, side: Side, row: int) -> Demand:
        """Return the pair of one case at one place."""
        M, V = self.pairs(span, x, side)
        return Demand(span, x, side, row, self.cases[row], float(M[row]), float(V[row]))

    def sag(self, span: int) -> Demand:
        """Return the largest moment of a span between the faces, at its exact station."""
        curves = self.solved.solution.span(span)
        start, end = self.beam.faces(span)
        found = curves.moment_extremes()
        x = np.clip(found.x_largest, start, end)
        values = np.where(x == found.x_largest, found.largest, -np.inf)
        for face in (start, end):
            values = np.maximum(values, curves.moment(np.array([face]))[:, 0])
        row = int(values.argmax())
        at = float(x[row])
        # Where no sagging moment arises the largest one is below zero.
        if values[row] > found.largest[row] + abs(found.largest[row]) * 1e-12 or (
            at != found.x_largest[row]
        ):
            ends = curves.moment(np.array([start, end]))[row]
            at = start if ends[0] >= ends[1] else end
        return self.demand(span, at, "right" if at < end else "left", row)

    def hog(self, support: int, side: End) -> Demand:
        """Return the smallest moment at a face of a support; ``side`` is the face's side of it."""
        span = support - 1 if side == "left" else support
        start, end = self.beam.faces(span)
        x = end if side == "left" else start
        M = self.moments(span, np.array([x]))
        return self.demand(span, x, side, int(M.argmin()))

    def face(self, support: int, side: End) -> tuple[int, float]:
        """Return span number and x of a face of a support."""
        span = support - 1 if side == "left" else support
        start, end = self.beam.faces(span)
        return span, end if side == "left" else start

    def has_span(self, support: int, side: End) -> bool:
        """Tell whether a span lies on that side of the support, which is not a free end."""
        if self.beam.supports[support - 1].kind == "free":
            return False
        return 1 <= (support - 1 if side == "left" else support) <= len(self.beam.spans)

    def reduced(self, support: int, row: int) -> bool:
        """Tell whether a case's moment at a support is reduced: where the top is in tension."""
        if support not in dict(self.reductions):
            return False
        spans = self.solution.combined(self.factors[row : row + 1]).spans
        beside = [spans[support - 2].end_moment] if support > 1 else []
        beside += [spans[support - 1].M0] if support <= len(spans) else []
        return any(float(M[0]) < 0 for M in beside)

    def factors_of(self, row: int) -> Mapping[Row, float]:
        """Return the factors of a case on the rows of the solution that act in it."""
        numbers = self.factors[row].tolist()
        return {key: f for key, f in zip(self.solution.rows, numbers, strict=True) if f}


def all_placements(spans: int) -> tuple[Arrangement, ...]:
    """Return the arrangements of 9.2.3.1, those beyond them, and every span alone (NBC 4.1.5.3)."""
    wide = standard_arrangements(spans, beyond=True)
    alone = (
        Arrangement(f"live load on span {number}", frozenset({number}))
        for number in range(1, spans + 1)
    )
    return tuple(dict.fromkeys((*wide, *alone)))


def other(end: End) -> End:
    """Return the other end or side."""
    return "right" if end == "left" else "left"
