"""The moment and shear coefficients of A23.3, 9.3.3, as a cross-check where they apply.

Coefficients are of w_f l_n^2 (moments) and w_f l_n / 2 (shear); l_n is the clear span, for a
negative moment the mean of the clear spans beside the support. The value 1/12 for stiff columns
and short slabs is not used: it is smaller than the others.
"""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Mapping, Sequence
from dataclasses import dataclass
from itertools import pairwise
from typing import Literal

import numpy as np

from lineproof.beams.analysis.arrangements import LIVE
from lineproof.beams.analysis.envelope import CaseSolution, span_moment
from lineproof.beams.analysis.model import Beam, Load, UniformLoad, check_loads

End = Literal["unrestrained", "spandrel", "column"]

Place = Literal["left face", "right face"]
PLACES: tuple[Place, Place] = ("left face", "right face")

POSITIVE = {"unrestrained": 11.0, "integral": 14.0, "interior": 16.0}
NEGATIVE = {"first, two spans": 9.0, "first": 10.0, "other": 11.0, "spandrel": 24.0, "column": 16.0}
"""Divisors of w_f l_n^2."""
SHEAR = {"first": 1.15, "other": 1.0}
"""A23.3, Table 9.1; the same set stands in Setareh and Darvas, Table A2.1."""
LONGEST_RATIO = 1.2
MOST_LIVE = 2.0
TWO = 2


@dataclass(frozen=True, slots=True)
class Row:
    """One coefficient beside the analysis: N and mm, moments with their sign, shears as sizes."""

    what: Literal["positive", "negative", "shear"]
    span: int
    place: Place | Literal["span"]
    coefficient: str
    by_coefficient: float
    by_analysis: float

    @property
    def ratio(self) -> float:
        """The analysis over the coefficient."""
        return self.by_analysis / self.by_coefficient


@dataclass(frozen=True, slots=True)
class CrossCheck:
    """The conditions that fail, one sentence each, or else the rows of the cross-check."""

    failed: tuple[str, ...]
    rows: tuple[Row, ...]


def conditions(beam: Beam, loads: Iterable[Load], factors: Mapping[str, float]) -> tuple[str, ...]:
    """Return the conditions of 9.3.3 that do not hold, one sentence each."""
    kept = check_loads(beam, loads)
    failed = []
    if len(beam.spans) < TWO:
        failed.append("one span only; two or more are needed")
    for number, (a, b) in enumerate(pairwise(beam.spans), start=1):
        ratio = max(a.length, b.length) / min(a.length, b.length)
        if ratio > LONGEST_RATIO * (1 + 1e-12):
            failed.append(
                f"of spans {number} and {number + 1} the longer is {ratio:.3g} times the shorter, "
                "more than 1.2"
            )
    if len({span.EI for span in beam.spans}) > 1:
        failed.append("EI is not the same in all spans")
    failed += [
        f"span {number} is a cantilever"
        for number in range(1, len(beam.spans) + 1)
        if beam.cantilever(number)
    ]
    failed += [
        f"the {load.kind} load on span {load.span} is not uniform over it"
        for load in kept
        if not isinstance(load, UniformLoad) and factors.get(load.kind)
    ]
    return (*failed, *_too_much_live(beam, kept, factors))


def _too_much_live(
    beam: Beam, loads: Sequence[Load], factors: Mapping[str, float]
) -> Iterator[str]:
    for number in range(1, len(beam.spans) + 1):
        live = _w(loads, factors, number, live=True)
        dead = _w(loads, factors, number, live=False)
        if live > MOST_LIVE * dead * (1 + 1e-12):
            yield (
                f"span {number}: factored live load {live:.4g} N/mm is more than twice the "
                f"factored dead load {dead:.4g} N/mm"
            )


def _w(loads: Sequence[Load], factors: Mapping[str, float], span: int, *, live: bool) -> float:
    return sum(
        factors.get(load.kind, 0.0) * load.w
        for load in loads
        if isinstance(load, UniformLoad) and load.span == span and (load.kind in LIVE) == live
    )


def cross_check(
    solved: CaseSolution,
    loads: Iterable[Load],
    factors: Mapping[str, float],
    ends: tuple[End, End] | None = None,
) -> CrossCheck:
    """Return coefficients and analysis side by side, or the conditions that fail.

    ``factors`` are the load factors of the combination by load type. ``ends`` says how the two end
    supports hold the beam; left out, a simple one is unrestrained and any other a column.
    """
    beam = solved.solution.beam
    kept = check_loads(beam, loads)
    failed = conditions(beam, kept, factors)
    if failed:
        return CrossCheck(failed, ())
    held = ends or (_end(beam, 0), _end(beam, -1))
    w = [
        _w(kept, factors, n, live=True) + _w(kept, factors, n, live=False)
        for n in range(1, len(beam.spans) + 1)
    ]
    rows = [
        row
        for number in range(1, len(beam.spans) + 1)
        for row in _of_span(solved, number, w[number - 1], held)
    ]
    return CrossCheck((), tuple(rows))


def _end(beam: Beam, place: int) -> End:
    return "unrestrained" if beam.supports[place].kind == "simple" else "column"


def _of_span(solved: CaseSolution, number: int, w: float, ends: tuple[End, End]) -> Iterator[Row]:
    beam = solved.solution.beam
    l_n = beam.clear(number)
    part = POSITIVE[_positive(number, len(beam.spans), ends)]
    most = span_moment(solved, number).value
    yield Row("positive", number, "span", f"1/{part:g}", w * l_n**2 / part, most)
    curves = solved.solution.span(number)
    x = np.array(beam.faces(number))
    least = curves.moment(x).min(axis=0).tolist()
    shear = np.abs(curves.shear(x)).max(axis=0).tolist()
    for support, place, M, V in zip((number, number + 1), PLACES, least, shear, strict=True):
        end, outer = _face_of(number, support, len(beam.spans), ends)
        if end != "unrestrained":
            by = -w * _mean_clear(beam, support) ** 2 / NEGATIVE[end]
            yield Row("negative", number, place, f"1/{NEGATIVE[end]:g}", by, M)
        factor = SHEAR["first" if outer else "other"]
        yield Row("shear", number, place, f"{factor:g}", factor * w * l_n / 2, V)


def _positive(number: int, spans: int, ends: tuple[End, End]) -> str:
    if number not in (1, spans):
        return "interior"
    end = ends[0] if number == 1 else ends[1]
    return "unrestrained" if end == "unrestrained" else "integral"


def _face_of(number: int, support: int, spans: int, ends: tuple[End, End]) -> tuple[str, bool]:
    """Return the row of the table for a face, and whether it is the first interior one."""
    if support in (1, spans + 1):
        return (ends[0] if support == 1 else ends[1]), False
    if (number, support) in ((1, 2), (spans, spans)):
        return ("first, two spans" if spans == TWO else "first"), True
    return "other", False


def _mean_clear(beam: Beam, support: int) -> float:
    beside = [n for n in (support - 1, support) if 1 <= n <= len(beam.spans)]
    return sum(beam.clear(n) for n in beside) / len(beside)
