"""Moments and shears of every case at stations along the beam, kept as pairs.

Nothing is enveloped before it must be: M and V of every case stand side by side, so the general
shear method can take the pair of one case, and every governing value says which case gave it.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from typing import Literal

import numpy as np

from lineproof.beams.analysis.arrangements import LoadCase
from lineproof.beams.analysis.curves import NEAR, Floats, Side
from lineproof.beams.analysis.model import Beam
from lineproof.beams.analysis.solve import Solution
from lineproof.errors import FaultList

Quantity = Literal["M", "V"]
PIECES = 20
"""Equal pieces a span is divided into, unless told otherwise."""


@dataclass(frozen=True, slots=True)
class Station:
    """A station: span number, distance from its left end [mm], side of a jump, what lies there.

    ``marks`` holds "support", "face", "d_v", "load" or nothing for a station between.
    """

    span: int
    x: float
    side: Side
    marks: tuple[str, ...] = ()


@dataclass(frozen=True, slots=True)
class Governing:
    """A governing value with the place and the case that gave it, and the value beside it.

    ``beside`` is V of the same case and place where the value is a moment, else M.
    """

    value: float
    span: int
    x: float
    case: LoadCase
    beside: float


@dataclass(frozen=True, eq=False, slots=True)
class Envelope:
    """M [N.mm] and V [N] of every case at every station: arrays (cases, stations)."""

    stations: tuple[Station, ...]
    cases: tuple[LoadCase, ...]
    M: Floats
    V: Floats

    def pairs(self, station: int) -> tuple[tuple[LoadCase, float, float], ...]:
        """Return case, M, V of every case at one station (its place in ``stations``)."""
        columns = self.M[:, station].tolist(), self.V[:, station].tolist()
        return tuple(zip(self.cases, *columns, strict=True))

    def governing(self, what: Quantity, *, largest: bool) -> tuple[Governing, ...]:
        """Return the largest or smallest M or V at every station with the case that gave it."""
        values, other = (self.M, self.V) if what == "M" else (self.V, self.M)
        rows = (values.argmax(axis=0) if largest else values.argmin(axis=0)).tolist()
        return tuple(
            Governing(float(values[row, i]), at.span, at.x, self.cases[row], float(other[row, i]))
            for i, (at, row) in enumerate(zip(self.stations, rows, strict=True))
        )

    def marked(self, mark: str, span: int | None = None) -> tuple[int, ...]:
        """Return the places in ``stations`` that carry a mark, of one span or of all."""
        return tuple(
            i
            for i, station in enumerate(self.stations)
            if mark in station.marks and span in (None, station.span)
        )


@dataclass(frozen=True, eq=False, slots=True)
class CaseSolution:
    """A solution whose rows are load cases, with their names."""

    solution: Solution
    cases: tuple[LoadCase, ...]


def stations_of(
    solution: Solution, d_v: Sequence[float] | None = None, pieces: int = PIECES
) -> tuple[Station, ...]:
    """Return the stations of a beam: equal pieces, faces, d_v from the faces, loads, supports.

    ``d_v`` holds one shear depth a span [mm]. At a load and at a support stand two stations, one a
    side. Raises :class:`UserError` if d_v does not fit the clear length.
    """
    beam = solution.beam
    _check_depths(beam, d_v, pieces)
    made: list[Station] = []
    for number in range(1, len(beam.spans) + 1):
        depth = None if d_v is None else d_v[number - 1]
        made += _of_span(beam, number, solution.span(number).breaks.tolist(), depth, pieces)
    return tuple(made)


def _check_depths(beam: Beam, d_v: Sequence[float] | None, pieces: int) -> None:
    faults = FaultList()
    if not 1 <= pieces <= 10_000:  # noqa: PLR2004 - more is a slip
        faults.add(f"pieces: {pieces}; write 1 to 10000")
    if d_v is not None and len(d_v) != len(beam.spans):
        faults.add(f"d_v: {len(d_v)} given for {len(beam.spans)} spans; write one a span")
    elif d_v is not None:
        for number, depth in enumerate(d_v, start=1):
            if not 0 < depth < beam.clear(number):
                faults.add(
                    f"d_v: {depth:g} mm in span {number}, whose clear length is "
                    f"{beam.clear(number):g} mm; write a depth less than that"
                )
    faults.raise_if_any()


def _of_span(
    beam: Beam, number: int, breaks: Sequence[float], d_v: float | None, pieces: int
) -> list[Station]:
    length = beam.spans[number - 1].length
    marked = [(length * i / pieces, "") for i in range(pieces + 1)]
    marked += [(x, "load") for x in breaks[1:-1]]
    left, right = beam.supports[number - 1 : number + 1]
    start, end = beam.faces(number)
    for support, axis, face, inward in ((left, 0.0, start, 1), (right, length, end, -1)):
        if support.kind != "free":
            marked += [(axis, "support"), (face, "face")]
            marked += [] if d_v is None else [(face + inward * d_v, "d_v")]
    stations = []
    for x, words in _merged(marked, NEAR * length):
        sides: tuple[Side, ...] = ("left", "right") if "load" in words else ("right",)
        if x in (0.0, length):
            sides = ("left" if x else "right",)
        stations += [Station(number, x, side, words) for side in sides]
    return stations


def _merged(
    marked: Sequence[tuple[float, str]], near: float
) -> list[tuple[float, tuple[str, ...]]]:
    """Return the stations in order with all that lies at each; the place of a mark is kept."""
    groups: list[list[tuple[float, str]]] = []
    for x, word in sorted(marked):
        if groups and x - groups[-1][0][0] <= near:
            groups[-1].append((x, word))
        else:
            groups.append([(x, word)])
    merged = []
    for group in groups:
        words = tuple(dict.fromkeys(word for _, word in group if word))
        x = next((x for x, word in group if word in {"support", "load"}), group[0][0])
        merged.append((x, words))
    return merged


def envelope(
    solved: CaseSolution, d_v: Sequence[float] | None = None, pieces: int = PIECES
) -> Envelope:
    """Return M and V of every case at the stations of the beam."""
    stations = stations_of(solved.solution, d_v, pieces)
    M, V = np.zeros((2, len(solved.cases), len(stations)))
    x = np.array([station.x for station in stations])
    left = np.array([station.side == "left" for station in stations])
    span = np.array([station.span for station in stations])
    for number, curves in enumerate(solved.solution.spans, start=1):
        here = slice(*np.searchsorted(span, [number, number + 1]))
        M[:, here] = curves.moment(x[here])
        both = curves.shear(x[here], "left"), curves.shear(x[here], "right")
        V[:, here] = np.where(left[here], *both)
    return Envelope(stations, solved.cases, M, V)


def span_moment(solved: CaseSolution, number: int) -> Governing:
    """Return the largest moment of a span, at its exact station."""
    curves = solved.solution.span(number)
    found = curves.moment_extremes()
    row = int(found.largest.argmax())
    x = float(found.x_largest[row])
    V = float(curves.shear(np.array([x]))[row, 0])
    return Governing(float(found.largest[row]), number, x, solved.cases[row], V)
