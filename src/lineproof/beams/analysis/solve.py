"""Direct stiffness of a continuous beam: the rotations at the supports are the unknowns.

Supports do not settle, so each span gives 4EI/l and 2EI/l to the rotations at its ends, a column
its own stiffness, and a cantilever the moment at its root. The matrix is small, symmetric and well
conditioned; it is solved once, for every pair of load type and span, and all cases are sums.

Sign convention: see ``curves``. A reaction is positive upward. The couple of a support is the jump
of M over it, right minus left.
"""

from __future__ import annotations

import math
from collections.abc import Iterable, Mapping, Sequence
from dataclasses import dataclass, replace

import numpy as np

from lineproof.beams.analysis.curves import Curves, Floats
from lineproof.beams.analysis.model import Beam, Load, PartialLoad, PointLoad, check_loads

Row = tuple[str, int]
"""Load type and span number of the loads that make one row of a solution."""

_GAUSS = 1 / math.sqrt(3)


@dataclass(frozen=True, eq=False, slots=True)
class Solution:
    """A solved beam: one row a load type and span, or after :meth:`combined` one row a case.

    ``reactions`` [N] and ``couples`` [N.mm] are (rows, supports).
    """

    beam: Beam
    rows: tuple[Row, ...]
    spans: tuple[Curves, ...]
    rotations: Floats
    reactions: Floats
    couples: Floats

    def span(self, number: int) -> Curves:
        """Return the curves of span ``number``, counted from 1."""
        return self.spans[number - 1]

    def combined(self, factors: Floats) -> Solution:
        """Return the solution of cases that are sums of these rows; factors (cases, rows)."""
        return Solution(
            self.beam,
            tuple(("case", number) for number in range(1, len(factors) + 1)),
            tuple(curves.combined(factors) for curves in self.spans),
            factors @ self.rotations,
            factors @ self.reactions,
            factors @ self.couples,
        )

    def factored(self, factors: Mapping[str, float]) -> Solution:
        """Return one case: every load type over all spans, times its factor (absent: 0)."""
        return self.combined(np.array([[factors.get(kind, 0.0) for kind, _ in self.rows]]))

    def total(self) -> Solution:
        """Return one case: all loads as given."""
        return self.combined(np.ones((1, len(self.rows))))


def solve(beam: Beam, loads: Iterable[Load]) -> Solution:
    """Solve a beam for its loads; raises :class:`UserError` if a load is not on the beam."""
    kept = check_loads(beam, loads)
    rows = tuple(dict.fromkeys((load.kind, load.span) for load in kept))
    placed = [_placed(beam, number, kept, rows) for number in range(1, len(beam.spans) + 1)]
    held = [_fixed_end(curves) for curves in placed]
    rotations = _rotations(beam, placed, held)
    ends = _end_moments(beam, placed, held, rotations)
    _tidy(beam, ends)
    spans = tuple(
        _curves(beam, number, curves, ends[number], rotations)
        for number, curves in enumerate(placed)
    )
    return Solution(beam, rows, spans, rotations, *support_forces(beam, spans))


def _placed(beam: Beam, number: int, loads: Sequence[Load], rows: Sequence[Row]) -> Curves:
    """Return a span with its loads, end values still zero."""
    span = beam.spans[number - 1]
    own = [load for load in loads if load.span == number]
    breaks = sorted({0.0, span.length, *(x for load in own for x in _edges(load, span.length))})
    index = {x: i for i, x in enumerate(breaks)}
    place = {row: i for i, row in enumerate(rows)}
    w, P = np.zeros((len(rows), len(breaks) - 1)), np.zeros((len(rows), len(breaks)))
    for load in own:
        row = place[load.kind, number]
        if isinstance(load, PointLoad):
            P[row, index[load.at]] += load.P
        else:
            start, end = _edges(load, span.length)
            w[row, index[start] : index[end]] += load.w
    none = np.zeros(len(rows))
    return Curves(
        float(span.length), float(span.EI), np.array(breaks), w, P, none, none, none, none
    )


def _edges(load: Load, length: float) -> tuple[float, ...]:
    if isinstance(load, PointLoad):
        return (float(load.at),)
    if isinstance(load, PartialLoad):
        return (float(load.start), float(load.end))
    return (0.0, length)


Held = tuple[Floats, Floats]
"""Moments at the ends of a span with its ends held, one entry a row."""


def _fixed_end(curves: Curves) -> Held:
    """Return M at both ends of the span with its ends held: left and right, hogging negative.

    A point load gives -P a b^2/l^2 and -P a^2 b/l^2. Along a uniform load that is a cubic, which
    two Gauss points integrate exactly and without cancellation.
    """
    length, breaks = curves.length, curves.breaks
    half = np.diff(breaks) / 2
    middle = breaks[:-1] + half
    left, right = np.zeros(len(curves.M0)), np.zeros(len(curves.M0))
    for weight, x in (
        (curves.P, breaks),
        (curves.w * half, middle - _GAUSS * half),
        (curves.w * half, middle + _GAUSS * half),
    ):
        left = left - weight @ (x * (length - x) ** 2) / length**2
        right = right - weight @ (x**2 * (length - x)) / length**2
    return left, right


def _rotations(beam: Beam, placed: Sequence[Curves], held: Sequence[Held]) -> Floats:
    """Return the rotation at every support (rows, supports); zero where fixed, and at free ends."""
    count, rows = len(beam.supports), len(held[0][0])
    K, out_of_balance = np.zeros((count, count)), np.zeros((rows, count))
    for i, curves in enumerate(placed):
        k = curves.EI / curves.length
        if beam.supports[i].kind == "free":
            out_of_balance[:, i + 1] += curves.load_moment(about=curves.length)
        elif beam.supports[i + 1].kind == "free":
            out_of_balance[:, i] += curves.load_moment(about=0.0)
        else:
            K[i : i + 2, i : i + 2] += k * np.array([[4.0, 2.0], [2.0, 4.0]])
            left, right = held[i]
            out_of_balance[:, i] -= left
            out_of_balance[:, i + 1] += right
    K += np.diag([support.stiffness for support in beam.supports])
    turning = [i for i, s in enumerate(beam.supports) if s.kind in ("simple", "elastic")]
    rotations = np.zeros((rows, count))
    if turning:
        found = np.linalg.solve(K[np.ix_(turning, turning)], out_of_balance[:, turning].T)
        rotations[:, turning] = found.T
    return rotations


def _end_moments(
    beam: Beam, placed: Sequence[Curves], held: Sequence[Held], rotations: Floats
) -> list[list[Floats]]:
    """Return M at both ends of every span."""
    ends = []
    for i, curves in enumerate(placed):
        none = np.zeros(len(rotations))
        if beam.supports[i].kind == "free":
            ends.append([none, curves.load_moment(about=curves.length)])
        elif beam.supports[i + 1].kind == "free":
            ends.append([-curves.load_moment(about=0.0), none])
        else:
            k, (left, right) = curves.EI / curves.length, held[i]
            near, far = rotations[:, i], rotations[:, i + 1]
            ends.append([left + k * (4 * near + 2 * far), right - k * (2 * near + 4 * far)])
    return ends


def _tidy(beam: Beam, ends: list[list[Floats]]) -> None:
    """Make M the same on both sides of a simple support to the last bit, and zero at an end."""
    for i, support in enumerate(beam.supports):
        if support.kind != "simple":
            continue
        if i == 0:
            ends[0][0] = np.zeros_like(ends[0][0])
        elif i == len(ends):
            ends[-1][1] = np.zeros_like(ends[-1][1])
        elif beam.cantilever(i):
            ends[i][0] = ends[i - 1][1]
        elif beam.cantilever(i + 1):
            ends[i - 1][1] = ends[i][0]
        else:
            ends[i - 1][1] = ends[i][0] = (ends[i - 1][1] + ends[i][0]) / 2


def _curves(
    beam: Beam, number: int, placed: Curves, ends: Sequence[Floats], rotations: Floats
) -> Curves:
    """Return a span with the values at its left end that belong to its end moments."""
    first, last = ends
    length = placed.length
    if beam.supports[number].kind == "free":
        V0 = np.zeros_like(first)
    elif beam.supports[number + 1].kind == "free":
        V0 = placed.total
    else:
        V0 = (last - first - placed.load_moment(about=length)) / length
    made = Curves(
        length, placed.EI, placed.breaks, placed.w, placed.P, first, V0, rotations[:, number],
        np.zeros_like(first),
    )  # fmt: skip
    return _hung(made, rotations[:, 1]) if beam.supports[number].kind == "free" else made


def _hung(curves: Curves, at_root: Floats) -> Curves:
    """Return a cantilever on the left, its slope and deflection counted from its root."""
    level = replace(curves, slope0=np.zeros_like(at_root))
    root = np.array([curves.length])
    slope0 = at_root - level.slope(root)[:, 0]
    y0 = -(level.deflection(root)[:, 0] + slope0 * curves.length)
    return replace(curves, slope0=slope0, y0=y0)


def support_forces(beam: Beam, spans: Sequence[Curves]) -> tuple[Floats, Floats]:
    """Return reactions [N] and couples [N.mm] (rows, supports): the jumps of V and M."""
    rows = len(spans[0].M0)
    reactions, couples = np.zeros((2, rows, len(beam.supports)))
    for i, curves in enumerate(spans):
        reactions[:, i] += curves.V0
        reactions[:, i + 1] -= curves.end_shear
        couples[:, i] += curves.M0
        couples[:, i + 1] -= curves.end_moment
    turning = [i for i, s in enumerate(beam.supports) if s.kind in ("simple", "free")]
    couples[:, turning] = 0.0
    return reactions, couples
