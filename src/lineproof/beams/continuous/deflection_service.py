"""Service moments of one span by stages, with live load where it deflects this span most.

Dead load lies on all spans. Every loaded span moves midspan of the span looked at (the tip of a
cantilever) up or down; live load is placed on those that move it down. Snow lies on all spans. A
stage "rise", with live load on the spans that move the place up, stands beside where that may
govern: where it moves the place more than the load that lets it sink, or where the place lies above
its level under dead or sustained load.

Hogging moments are positive here: ``M_h1`` at the left axis, ``M_h2`` at the right axis. N and mm.
"""

from __future__ import annotations

from collections.abc import Iterable, Mapping, Sequence
from dataclasses import dataclass, field
from typing import Literal

import numpy as np

from lineproof.beams.analysis.arrangements import (
    LIVE,
    Combination,
    loaded_spans,
    service_combinations,
)
from lineproof.beams.analysis.curves import Floats
from lineproof.beams.analysis.model import Beam, Load, PartialLoad, PointLoad
from lineproof.beams.analysis.solve import Row, Solution, solve
from lineproof.errors import UserError
from lineproof.standards.a23_3 import deflection_stages as clause

Stage = Literal["dead", "sustained", "all", "rise"]
STAGES: tuple[Stage, ...] = ("dead", "sustained", "all")
"""The stages that every span has."""
FreeEnd = Literal["", "left", "right"]
"""Which end of a span is free; "" for a span between supports."""

SHARES: Mapping[str, float] = {"L": 0.5, "L_st": 1.0, "S": 0.0}
"""Share of each load type that is sustained, where nothing else is known: an assumption."""
SHARE_ASSUMED = "assumed, to be confirmed by the designer"
_LEFT_OUT = ("W", "E")
_STORED = ("storage area", "library stack room")
DEFLECTION = "deflection"


def deflection_key(span: int, of: str = "") -> str:
    """Return the key of the part with the deflection of a span, or ``of`` something in it."""
    return "-".join((DEFLECTION, str(span), *([of] if of else ())))


def sustained_share(use: str) -> tuple[str, str]:
    """Return the share of the live load of a use that is sustained, and what to say of it.

    >>> sustained_share("office")
    ('0.5', 'assumed, to be confirmed by the designer')
    """
    return ("1.0" if use in _STORED else "0.5"), SHARE_ASSUMED


@dataclass(frozen=True, slots=True)
class Point:
    """A point load of a stage [N] at a station from the left axis of its span [mm]."""

    P: float
    x: float


@dataclass(frozen=True, slots=True)
class StageMoments:
    """Moments of one stage [N.mm] and the point loads that bend otherwise than a uniform load.

    Of a cantilever only ``M_h1`` counts, at its root; ``M_mb`` and ``M_hb`` are moments of the span
    behind, at its midspan and at the root. ``earlier`` holds the largest moments reached before at
    midspan, left and right: a construction stage, or other arrangements.
    """

    M_m: float
    M_h1: float
    M_h2: float
    points: tuple[Point, ...] = ()
    M_mb: float = 0.0
    M_hb: float = 0.0
    behind: tuple[Point, ...] = ()
    earlier: tuple[float, float, float] = (0.0, 0.0, 0.0)


@dataclass(frozen=True)
class ServiceMoments:
    """Service moments of one span at every stage, with the case that gave them.

    ``live_spans`` carry live load. ``factors`` gives the factor of every row of the solution (load
    type, span) at every stage, for whoever records the statics of it.
    """

    span: int
    free: FreeEnd
    case: str
    live_spans: tuple[int, ...]
    factors: Mapping[Stage, Mapping[Row, float]]
    stages: Mapping[Stage, StageMoments]
    left_out: tuple[str, ...] = field(default=())
    rise_case: str = ""
    rise_spans: tuple[int, ...] = ()

    @property
    def arrangement(self) -> str:
        """The spans with live load in words."""
        return loaded_spans(self.live_spans)

    @property
    def lifting(self) -> str:
        """The spans with live load that lift the span in words; "" where that cannot govern."""
        return loaded_spans(self.rise_spans) if "rise" in self.stages else ""

    def factors_on(self, kind: str, span: int) -> dict[Stage, float]:
        """Return the factors of a load type on a span by stage; stages without it are absent."""
        found = {stage: each.get((kind, span), 0.0) for stage, each in self.factors.items()}
        return {stage: factor for stage, factor in found.items() if factor}


def free_end(beam: Beam, span: int) -> FreeEnd:
    """Return which end of a span is free."""
    left, right = beam.supports[span - 1 : span + 1]
    return "left" if left.kind == "free" else "right" if right.kind == "free" else ""


def span_behind(beam: Beam, span: int) -> int | None:
    """Return the number of the span behind a cantilever, None where its root is fixed.

    Raises :class:`UserError` where nothing but a column holds the root.
    """
    free = free_end(beam, span)
    behind = span + 1 if free == "left" else span - 1
    root = beam.supports[span if free == "left" else span - 1]
    if root.kind == "fixed":
        return None
    if not 1 <= behind <= len(beam.spans):
        raise UserError(
            f"span {span}: a cantilever held by a column alone; the rotation of its root is not "
            "covered here: write a fixed support or add the span behind it"
        )
    return behind


def service_moments(
    beam: Beam,
    loads: Iterable[Load],
    span: int,
    *,
    shares: Mapping[str, float] = SHARES,
    solution: Solution | None = None,
) -> ServiceMoments:
    """Return the service moments of a span; NBC service combination and arrangement by deflection.

    ``shares`` gives the sustained part of every load type but dead load. Wind and earthquake are
    left out and named. ``solution`` may be passed on where the loads have been solved before.
    """
    kept = tuple(loads)
    solution = solve(beam, kept) if solution is None else solution
    free = free_end(beam, span)
    length = beam.spans[span - 1].length
    at = 0.0 if free == "left" else length if free == "right" else length / 2
    moved = solution.span(span).deflection(np.array([at]))[:, 0].tolist()
    kinds = dict.fromkeys(kind for kind, _ in solution.rows)
    acting = [kind for kind in kinds if kind not in _LEFT_OUT]
    down, case = _chosen(solution.rows, moved, acting, 1.0)
    up, rise_case = _chosen(solution.rows, moved, acting, -1.0)
    factors = {stage: _of_stage(stage, down, shares) for stage in STAGES}
    by_row = dict(zip(solution.rows, moved, strict=True))
    if _may_govern(by_row, down, up, (factors["dead"], factors["sustained"])):
        factors["rise"] = up
    rows = _rows_of(solution, span, free)
    return ServiceMoments(
        span,
        free,
        case,
        _live_spans(down),
        {stage: {row: f for row, f in each.items() if f} for stage, each in factors.items()},
        {stage: _moments(beam, kept, rows, each) for stage, each in factors.items()},
        tuple(kind for kind in kinds if kind in _LEFT_OUT),
        rise_case,
        _live_spans(up),
    )


def _chosen(
    rows: Sequence[Row], moved: Sequence[float], kinds: Iterable[str], sign: float
) -> tuple[dict[Row, float], str]:
    """Return factors and name of the combination that moves the place most: 1 down, -1 up."""
    signed = [sign * y for y in moved]
    tried = [(_placed(rows, signed, c), c.name) for c in service_combinations(kinds)]

    def moves(each: tuple[dict[Row, float], str]) -> float:
        return sum(f * y for f, y in zip(each[0].values(), signed, strict=True))

    return max(tried, key=moves)


def _may_govern(
    moved: Mapping[Row, float],
    down: Mapping[Row, float],
    up: Mapping[Row, float],
    lasting: Iterable[Mapping[Row, float]],
) -> bool:
    """Tell whether a rise may exceed the sag: elastic, of gross sections."""

    def of(factors: Mapping[Row, float], *, dead: bool) -> float:
        return sum(f * moved[row] for row, f in factors.items() if dead or row[0] != "D")

    above = any(of(factors, dead=True) < 0 for factors in lasting)
    return above or -of(up, dead=False) > of(down, dead=False)


def _live_spans(factors: Mapping[Row, float]) -> tuple[int, ...]:
    return tuple(sorted({number for (kind, number), f in factors.items() if kind in LIVE and f}))


def _placed(
    rows: Sequence[Row], moved: Sequence[float], combination: Combination
) -> dict[Row, float]:
    """Return the factor of every row: live load only where it moves the place that way."""
    factors = dict(combination.factors)
    return {
        row: factors.get(row[0], 0.0) if row[0] not in LIVE or y > 0 else 0.0
        for row, y in zip(rows, moved, strict=True)
    }


def _of_stage(
    stage: Stage, at_all: Mapping[Row, float], shares: Mapping[str, float]
) -> dict[Row, float]:
    def share(kind: str) -> float:
        if kind == "D" or stage == "all":
            return 1.0
        return shares.get(kind, 0.0) if stage == "sustained" else 0.0

    return {row: f * share(row[0]) for row, f in at_all.items()}


def _moments(
    beam: Beam, loads: Iterable[Load], rows: _Rows, factors: Mapping[Row, float]
) -> StageMoments:
    kept, numbers = tuple(loads), np.array(list(factors.values()))
    values = (numbers @ rows.moments).tolist()
    points = local_points(beam, kept, rows.span, factors)
    if not rows.free:
        M_m, left, right = values
        return StageMoments(M_m, 0.0 - left, 0.0 - right, points)
    root = 0.0 - values[0]
    if rows.behind is None:
        return StageMoments(0.0, root, 0.0, points)
    behind = local_points(beam, kept, rows.behind, factors)
    return StageMoments(0.0, root, 0.0, points, values[1], 0.0 - values[2], behind)


@dataclass(frozen=True, eq=False)
class _Rows:
    """Moments that count for one span, by row of the solution: (rows, places).

    Midspan, left and right axis; of a cantilever its root, then midspan and root behind.
    """

    span: int
    free: FreeEnd
    behind: int | None
    moments: Floats


def _rows_of(solution: Solution, span: int, free: FreeEnd) -> _Rows:
    def at(number: int, *parts: float) -> Floats:
        x = np.array(parts) * solution.beam.spans[number - 1].length
        return solution.span(number).moment(x)

    if not free:
        return _Rows(span, free, None, at(span, 0.5, 0.0, 1.0))
    root = 1.0 if free == "left" else 0.0
    behind = span_behind(solution.beam, span)
    own = at(span, root)
    if behind is None:
        return _Rows(span, free, None, own)
    return _Rows(span, free, behind, np.hstack([own, at(behind, 0.5, 1.0 - root)]))


def local_points(
    beam: Beam, loads: Iterable[Load], span: int, factors: Mapping[Row, float]
) -> tuple[Point, ...]:
    """Return point and partial loads of a span as point loads that deflect it alike."""
    length = beam.spans[span - 1].length
    halved = not free_end(beam, span)
    made: list[Point] = []
    for load in loads:
        factor = factors.get((load.kind, load.span), 0.0) if load.span == span else 0.0
        if factor and isinstance(load, PointLoad):
            made.append(Point(factor * load.P, load.at))
        elif factor and isinstance(load, PartialLoad):
            for start, end in pieces(load.start, load.end, length, halved=halved):
                made += two_points(factor * load.w, start, end)
    return tuple(made)


def pieces(
    start: float, end: float, length: float, *, halved: bool
) -> tuple[tuple[float, float], ...]:
    """Return the stretch of a partial load, parted at midspan between supports."""
    middle = length / 2
    if halved and start < middle < end:
        return (start, middle), (middle, end)
    return ((start, end),)


def two_points(w: float, start: float, end: float) -> tuple[Point, Point]:
    """Return two point loads that act on any cubic as a uniform load does (Gauss).

    ``w`` in N/mm between the stations ``start`` and ``end`` [mm].
    """
    P = clause.HALF_OF_PARTIAL.function(w, end, start)
    first = clause.FIRST_POINT.function(start, end)
    return Point(P, first), Point(P, clause.SECOND_POINT.function(start, end))
