"""Moment and tension that the bars must carry along a beam: envelopes of all load cases.

The tension is that of 11.3.9.2 and 11.3.9.3, moment and shear of the same load case:
(+-M_f)/d_v + (V_f - 0.5 V_s) cot(theta), V_s at most V_f, at most what the largest moment of that
face needs alone (11.3.9.4, and the rule of 11.3.9.1 that bars extend past the flexural need). For
the top bars the largest moment is that of the half of the span, since each end has its own.
"""

from __future__ import annotations

from dataclasses import dataclass, replace
from functools import lru_cache

import numpy as np
from numpy.typing import NDArray

from lineproof.beams.analysis.curves import Floats
from lineproof.beams.continuous.anchorage import value
from lineproof.beams.continuous.detailing_data import THETA, Designed, ShearStretch
from lineproof.beams.continuous.forces import ENDS, Demand, End
from lineproof.beams.continuous.layout import SAME_PLACE, Face
from lineproof.beams.continuous.resistance import area_for, section_depth, shear_depth, yield_force
from lineproof.standards.a23_3 import shear_bars, torsion

Whole = NDArray[np.intp]
Truths = NDArray[np.bool_]
NO_SHEAR = ShearStretch(0.0, 0.0, 0.0, 0.0, THETA)
NOTHING = 1e3
"""A moment [N.mm] or force [N, times 1 mm] that is none: round-off of the analysis."""
TIP = 50.0
"""Length of bars at a free end, inside the cover, in which nothing is asked of them [mm]."""


@dataclass(frozen=True, eq=False, slots=True)
class Side:
    """Demand of one face along one span: moment (positive: this face in tension), tension.

    The rows say which load case gives them. ``free`` is the tension before its cap. ``torsion`` is
    the force with torsion, where it counts: it has no cap (11.3.10.6).
    """

    M: Floats
    M_row: Whole
    free: Floats
    F_row: Whole
    cap: Floats
    torsion: Floats | None = None

    @property
    def F(self) -> Floats:
        """The tension, at most what the largest moment needs alone."""
        return np.clip(np.minimum(self.free, self.cap), 0.0, None)

    @property
    def force(self) -> Floats:
        """The tension that bars are laid for: with torsion where it counts."""
        return self.F if self.torsion is None else np.maximum(self.F, self.torsion)

    def crossings(self, x: Floats) -> list[float]:
        """Return the places between the stations x at which the tension reaches its cap.

        Where no bars would do the tension is infinite: between such a station and the next one
        there is no place to give.
        """
        over = self.free - self.cap
        finite, above = np.isfinite(over), np.sign(over)
        at = np.flatnonzero((above[:-1] * above[1:] < 0) & finite[:-1] & finite[1:])
        part = over[at] / (over[at] - over[at + 1])
        found: list[float] = (x[at] + part * (x[at + 1] - x[at])).tolist()
        return found

    def between(self, at: Floats, x: Floats) -> Side:
        """Return the demand at places x between the stations ``at``; rows have no meaning."""
        M, free = np.interp(x, at, self.M), np.interp(x, at, self.free)
        nearest = np.clip(np.searchsorted(at, x), 0, len(at) - 1)
        cap = np.maximum(self.cap[nearest], self.cap[np.maximum(nearest - 1, 0)])
        none = np.zeros(len(x), dtype=np.intp)
        turned = None if self.torsion is None else np.interp(x, at, self.torsion)
        return Side(M, none, free, none, cap, turned)


@dataclass(frozen=True, eq=False, slots=True)
class SpanDemand:
    """Demand along one span; ``x`` along the beam, ``local`` from the left axis of the span."""

    span: int
    x: Floats
    local: Floats
    bottom: Side
    top: Side

    def side(self, face: Face) -> Side:
        """Return the demand of a face."""
        return self.bottom if face == "bottom" else self.top


def stretch_at(designed: Designed, x: float) -> ShearStretch:
    """Return the shear resistance at a place: where stretches meet, the weaker."""
    return stretches_at(designed, np.array([x]))[0]


def stretches_at(designed: Designed, x: Floats) -> list[ShearStretch]:
    """Return :func:`stretch_at` of many places at once."""
    if not len(x):
        return []
    start, end, rank = designed.shear_table
    start, end = start - SAME_PLACE, end + SAME_PLACE
    near = np.flatnonzero((start <= x.max()) & (x.min() <= end))
    if not len(near):
        return [NO_SHEAR] * len(x)
    met = (start[near] <= x[:, None]) & (x[:, None] <= end[near])
    weakest = np.where(met, rank[near], np.inf).argmin(axis=1)
    found = met[np.arange(len(x)), weakest]
    return [
        designed.shear[n] if there else NO_SHEAR
        for n, there in zip(near[weakest].tolist(), found.tolist(), strict=True)
    ]


@lru_cache(maxsize=1024)
def _cot(theta: float) -> float:
    return float(1 / np.tan(np.radians(theta)))


def covered_length(designed: Designed, span: int) -> tuple[float, float]:
    """Return where the bars of a span must carry: between faces, at inner supports to the axis."""
    left, right = designed.forces.beam.faces(span)
    last = len(designed.outline.supports)
    start = left if span == 1 else 0.0
    end = right if span + 1 == last else designed.outline.lengths[span - 1]
    tip = designed.end_cover + TIP
    if not designed.held(span):
        start = tip
    if not designed.held(span + 1):
        end -= tip
    return start, end


def stations(designed: Designed, span: int, count: int) -> Floats:
    """Return ``count`` stations on whole mm from the left axis, and those where V jumps."""
    start, end = covered_length(designed, span)
    left, right = designed.forces.beam.faces(span)
    even = np.clip(np.round(np.linspace(start, end, count)), start, end)
    axis = designed.outline.axes[span - 1]
    jumps = [float(b) for b in designed.forces.solved.solution.span(span).breaks]
    jumps += _inside(np.concatenate(designed.shear_table[:2]) - axis, start - 2.0, end + 2.0)
    near = [b + step for b in jumps for step in (-1.0, 0.0, 1.0)]
    extra = [x for x in (left, right, *near) if start <= x <= end]
    made: Floats = np.unique(np.concatenate([even, extra]))
    return made


def _inside(x: Floats, start: float, end: float) -> list[float]:
    """Return the places that lie from start to end."""
    found: list[float] = x[(start <= x) & (x <= end)].tolist()
    return found


@lru_cache(maxsize=24)
def demand_of(designed: Designed, span: int, count: int) -> SpanDemand:
    """Return moment and tension of both faces along a span; inside supports, those of the face."""
    local = stations(designed, span, count)
    return demand_at(designed, span, local)


def demand_at(designed: Designed, span: int, local: Floats) -> SpanDemand:
    """Return moment and tension of both faces at stations from the left axis of a span."""
    left, right = designed.forces.beam.faces(span)
    at = np.clip(local, left, right)
    M, V = designed.forces.along(span, at)
    before = designed.forces.shears(span, at, "left")
    V = np.maximum(np.abs(V), np.abs(before))
    axis = designed.outline.axes[span - 1]
    met = stretches_at(designed, local + axis)
    V_s = np.array([s.V_s for s in met])
    cot = np.array([_cot(s.theta) for s in met])
    extra = np.maximum(V - 0.5 * np.minimum(V_s, V), 0.0) * cot
    inside = (local < left) | (local > right)
    bottom = _side(M, extra, inside, *_bottom(designed, span))
    top = _top_side(designed, span, local, M, extra, inside)
    turned = designed.torsion.get(span)
    if turned is not None:
        bottom = replace(bottom, torsion=np.interp(at, turned.x, turned.bottom))
        top = replace(top, torsion=np.interp(at, turned.x, turned.top))
    return SpanDemand(span, local + axis, local, bottom, top)


def _bottom(designed: Designed, span: int) -> tuple[float, float]:
    d = section_depth(designed, "bottom", span)
    d_v = shear_depth(d, designed.outline.depths[span - 1])
    return d_v, cap_of(designed, "bottom", span, "left")


def cap_of(designed: Designed, face: Face, span: int, end: End) -> float:
    """Return the tension that the largest moment of a face needs alone [N]."""
    support = span if end == "left" else span + 1
    d = section_depth(designed, face, span, support)
    b = designed.outline.widths[span - 1] if face == "bottom" else designed.outline.b_w
    return yield_force(designed) * area_for(designed, largest(designed, face, span, end), d, b)


def largest(designed: Designed, face: Face, span: int, end: End) -> float:
    """Return the largest moment of a face: of a span, of its half for the top; 0 for none."""
    found = largest_at(designed, face, span, end)
    return max(found.M if face == "bottom" else -found.M, 0.0)


def largest_at(designed: Designed, face: Face, span: int, end: End) -> Demand:
    """Return where and in which case that moment stands."""
    if face == "bottom":
        return designed.sags[span - 1]
    left, right = designed.forces.beam.faces(span)
    middle = (left + right) / 2
    a, b = (left, middle) if end == "left" else (middle, right)
    if designed.cantilever(span):
        a, b = left, right
    x = np.linspace(a, b, 21)
    M = designed.forces.moments(span, x)
    row, column = np.unravel_index(int(M.argmin()), M.shape)
    return designed.forces.demand(span, float(x[column]), end, int(row))


def _side(
    M: Floats, extra: Floats, inside: Truths, d_v: float | Floats, cap: float | Floats
) -> Side:
    F = M / d_v + np.where(inside, 0.0, extra)
    M_row, F_row = M.argmax(axis=0), F.argmax(axis=0)
    columns = np.arange(M.shape[1])
    caps = np.broadcast_to(np.asarray(cap, dtype=float), columns.shape)
    return Side(M[M_row, columns], M_row, F[F_row, columns], F_row, caps)


def _top_side(
    designed: Designed, span: int, local: Floats, M: Floats, extra: Floats, inside: Truths
) -> Side:
    h = designed.outline.depths[span - 1]
    middle = sum(designed.forces.beam.faces(span)) / 2
    first = local < middle
    d_v = [shear_depth(section_depth(designed, "top", span, j), h) for j in (span, span + 1)]
    caps = [cap_of(designed, "top", span, end) for end in ENDS]
    return _side(
        -M, extra, inside, np.where(first, d_v[0], d_v[1]), np.where(first, caps[0], caps[1])
    )


def end_tension(designed: Designed, support: int) -> float:
    """Return the tension of 11.3.9.5 at the inner face of an end support [N], or the one given."""
    if support in designed.end_forces:
        return designed.end_forces[support]
    return max(end_tensions(designed, support))


def end_tensions(designed: Designed, support: int) -> list[float]:
    """Return the tension of 11.3.9.5 at the inner face of an end support by case [N].

    With torsion (11.3.10.6) in the cases in which it counts there.
    """
    span = 1 if support == 1 else len(designed.outline.lengths)
    left, right = designed.forces.beam.faces(span)
    x = left if support == 1 else right
    _, V = designed.forces.pairs(span, x, "right" if support == 1 else "left")
    inside = x + (1.0 if support == 1 else -1.0) + designed.outline.axes[span - 1]
    met = stretch_at(designed, inside)
    T = end_torsion(designed, support)
    made = []
    for row, v in enumerate(V.tolist()):
        given = {"V_f": abs(v), "V_s": met.V_s, "theta": met.theta}
        if T is not None and T.T_f[row] > 0:
            given |= {"T_f": T.T_f[row], "p_h": T.p_h, "A_o": T.A_o}
            made.append(value(torsion.END_SUPPORT, **given))
        else:
            made.append(value(shear_bars.END_SUPPORT, **given))
    return made


@dataclass(frozen=True, eq=False, slots=True)
class EndTorsion:
    """Torsion designed for at the inner face of an end support by case, and the stirrups."""

    T_f: list[float]
    p_h: float
    A_o: float


def end_torsion(designed: Designed, support: int) -> EndTorsion | None:
    """Return the torsion at the inner face of an end support; None where none counts."""
    turned = designed.torsion.get(1 if support == 1 else len(designed.outline.lengths))
    if turned is None:
        return None
    T_f = turned.ends[0 if support == 1 else 1].tolist()
    return EndTorsion(T_f, turned.p_h, turned.A_o)
