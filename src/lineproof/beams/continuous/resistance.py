"""Resistance of the bars as detailed along a beam: every bar counted as far as it is developed.

The stress of a bar rises in proportion to the distance from its end, over its development length
(with a hook: over that of the hook, from the outside of the hook; at a lap of like bars: over the
lap, the whole overlap where that is longer, so that two lapped bars never count more than one).
Compression bars are not counted.
"""

from __future__ import annotations

from bisect import bisect_left, bisect_right
from collections.abc import Callable, Iterable, Sequence
from dataclasses import dataclass

import numpy as np

from lineproof.beams.analysis.curves import Floats
from lineproof.beams.bars import BarLayer, BarLayers, centre_of, layer_of
from lineproof.beams.continuous.anchorage import bar_of, develop, hook_at, value
from lineproof.beams.continuous.detailing_data import Designed
from lineproof.beams.continuous.layout import BarRun, BeamOutline, Face
from lineproof.standards.a23_3 import bars as bar_clause
from lineproof.standards.a23_3 import shear
from lineproof.standards.a23_3.bars import BARS

PAIR = 2
MOST_LAP = 150.0
"""Longest overlap of like bars that is a lap, in bar diameters: more are two sets of bars.

1.3 x 0.60 x 1.7 x 500/sqrt(20) = 148 is the class B lap of coated top bars 500R in 20 MPa.
"""


WHOLE = 1 - 1e-9
"""Part of the lap needed from which an overlap is a whole lap, but for round-off."""


@dataclass(frozen=True, slots=True)
class Standing:
    """A run with what its resistance needs: lengths over which its stress rises, at either end.

    ``distance`` is that of the bar centres from the face of the bars. ``whole_start`` and
    ``whole_end`` tell of laps that are long enough, over which two bars together reach yield.
    """

    run: BarRun
    rise_start: float
    rise_end: float
    distance: float
    lap_start: bool
    lap_end: bool
    whole_start: bool
    whole_end: bool

    def developed(self, x: Floats) -> Floats:
        """Return the part of the yield strength that the bars reach at the stations x."""
        from_start = (x - self.run.start) / self.rise_start
        from_end = (self.run.end - x) / self.rise_end
        part: Floats = np.clip(np.minimum(from_start, from_end), 0.0, 1.0)
        return part


def alike(a: BarRun, b: BarRun) -> bool:
    """Tell whether two runs are the same bars, one behind the other."""
    return (
        a.face == b.face and a.layer == b.layer and a.place == b.place
        and a.size == b.size and a.number == b.number
    )  # fmt: skip


def lapped(first: BarRun, second: BarRun) -> bool:
    """Tell whether the end of one run laps the start of the other, like bars in line."""
    return alike(first, second) and _overlap(first, second, first.diameter)


def _overlap(first: BarRun, second: BarRun, diameter: float) -> bool:
    """Tell whether a run ends inside the next, on a length that is a lap of that diameter."""
    if not first.start < second.start < first.end < second.end:
        return False
    return first.end - second.start <= MOST_LAP * diameter


def in_line(first: BarRun, second: BarRun) -> bool:
    """Tell whether one run is lapped with the next, of one size or, two corner bars, of another."""
    if alike(first, second):
        return lapped(first, second)
    a, b = ((r.face, r.layer, r.place, r.number) for r in (first, second))
    thicker = max(first.diameter, second.diameter)
    return a == b and first.number == PAIR and _overlap(first, second, thicker)


def lap_pairs(
    runs: Sequence[BarRun], test: Callable[[BarRun, BarRun], bool] = in_line
) -> tuple[tuple[int, int], ...]:
    """Return which runs are lapped, by their places in the list: one that ends, one that starts.

    Every end has one mate at most: of several a like one, then one that serves the same, as pieces
    of one bar do, then the one with the longest overlap.
    """
    order = sorted(range(len(runs)), key=lambda j: runs[j].start)
    starts = [runs[j].start for j in order]
    found = [
        (first.end - runs[j].start, i, j)
        for i, first in enumerate(runs)
        # Of those that start inside it.
        for j in order[bisect_right(starts, first.start) : bisect_left(starts, first.end)]
        if first.end < runs[j].end and test(first, runs[j])
    ]
    ended: set[int] = set()
    started: set[int] = set()
    made = []

    def rank(row: tuple[float, int, int]) -> tuple[bool, bool, float, int, int]:
        overlap, i, j = row
        first, second = runs[i], runs[j]
        return not alike(first, second), first.serves != second.serves, -overlap, i, j

    for _, i, j in sorted(found, key=rank):
        if i not in ended and j not in started:
            ended.add(i)
            started.add(j)
            made.append((i, j))
    return tuple(made)


def level_pairs(
    outline: BeamOutline,
    runs: Sequence[BarRun],
    test: Callable[[BarRun, BarRun], bool] = in_line,
) -> tuple[tuple[int, int], ...]:
    """Return the laps of :func:`lap_pairs` but those of bottom bars where the soffit steps."""
    return tuple(
        (i, j)
        for i, j in lap_pairs(runs, test)
        if runs[i].face == "top" or depth_of(outline, runs[i]) == depth_of(outline, runs[j])
    )


def depth_of(outline: BeamOutline, run: BarRun) -> float:
    """Return the depth of the span that the middle of a run lies in [mm]."""
    return outline.depths[span_at(outline, (run.start + run.end) / 2) - 1]


def distance_of(designed: Designed, run: BarRun) -> float:
    """Return the distance of the centres of a run's bars from their face [mm]."""
    if run.layer == 1:
        return _distance(designed, run.diameter)
    first = max(layer.diameter for layer in first_layers(designed, run))
    return _distance(designed, run.diameter, first)


def _distance(designed: Designed, d_b: float, first: float = 0.0) -> float:
    """Return how far bars of diameter d_b lie inside their face, over a ``first`` layer [mm]."""
    outside = designed.outline.cover + BARS.number(designed.basis.stirrups.size, "d_b")
    if first:
        thicker = max(first, d_b)
        s_l = value(bar_clause.LAYER_DISTANCE, d_b=thicker, a_max=designed.strengths.a_max)
        outside = outside + first + s_l
    return outside + d_b / 2


def first_layers(designed: Designed, run: BarRun) -> Sequence[BarLayer]:
    """Return the first layers that a bar of a second layer stands over."""
    axes = designed.outline.axes
    if run.face == "bottom":
        places = zip(axes[:-1], axes[1:], designed.bars.bottom, strict=True)
        met = [row for a, b, row in places if run.start < b and run.end > a]
    else:
        tops = (top.web for top in designed.bars.top)
        met = [row for x, row in zip(axes, tops, strict=True) if run.start <= x <= run.end]
    two = [row[0] for row in met if len(row) > 1]
    return two or [row[0] for row in met if row] or [BarLayer(2, run.size)]


def stand(designed: Designed, runs: Iterable[BarRun]) -> tuple[Standing, ...]:
    """Return the runs with the lengths over which their stress rises."""
    kept = [run for run in runs if run.place != "side face"]
    pairs = level_pairs(designed.outline, kept, lapped)
    ends = {i: kept[i].end - kept[j].start for i, j in pairs}
    starts = {j: kept[i].end - kept[j].start for i, j in pairs}
    last = len(designed.outline.supports)

    def hook(support: int, run: BarRun) -> float:
        return hook_at(designed, support, run.size, outside=run.outside).l_dh

    made = []
    for index, run in enumerate(kept):
        bar = develop(designed.basis, bar_of(designed, run))
        lap_start, lap_end = index in starts, index in ends
        rise_start = max(bar.lap, starts[index]) if lap_start else bar.l_d
        rise_end = max(bar.lap, ends[index]) if lap_end else bar.l_d
        made.append(
            Standing(
                run,
                hook(1, run) if run.hook_start else rise_start,
                hook(last, run) if run.hook_end else rise_end,
                distance_of(designed, run), lap_start, lap_end,
                lap_start and starts[index] >= bar.lap * WHOLE,
                lap_end and ends[index] >= bar.lap * WHOLE,
            )
        )  # fmt: skip
    return tuple(made)


def yield_force(designed: Designed) -> float:
    """Return the factored force of 1 mm2 of bars at yield [N]."""
    return designed.strengths.phi_s * designed.strengths.f_y


def effective_depth(designed: Designed, layers: BarLayers, h: float) -> float:
    """Return the effective depth of layers counted in full [mm]."""
    groups = (
        (group, layers[0].diameter if number else 0.0)
        for number, layer in enumerate(layers)
        for group in layer.groups
    )
    _, d = centre_of(
        (group.area, h - _distance(designed, group.diameter, first)) for group, first in groups
    )
    return d


def top_layers(designed: Designed, support: int) -> BarLayers:
    """Return the top bars of a support by layer, those of the overhangs with the first one."""
    top = designed.bars.top[support - 1]
    if not top.web:
        return (BarLayer(2, designed.bars.holders),)
    first = layer_of([*top.web[0].groups, *top.spread])
    return (first, *top.web[1:])


def section_depth(designed: Designed, face: Face, span: int, support: int = 0) -> float:
    """Return the effective depth of the bars below a span, or above a support in that span."""
    h = designed.outline.depths[span - 1]
    if face == "bottom":
        return effective_depth(designed, designed.bars.bottom[span - 1], h)
    return effective_depth(designed, top_layers(designed, support), h)


def shear_depth(d: float, h: float) -> float:
    """Return the effective shear depth."""
    return value(shear.D_V, d=d, h=h)


def moment_of(designed: Designed, A: Floats, d: Floats, b: Floats) -> Floats:
    """Return the moment resistance of developed bars of area A at depth d; web and flange b."""
    s, outline = designed.strengths, designed.outline
    stress = s.alpha_1 * s.phi_c * s.f_c
    force = yield_force(designed) * A
    whole = force / (stress * b)
    flange = stress * (b - outline.b_w) * outline.h_f
    web = (force - flange) / (stress * outline.b_w)
    tee = flange * (d - outline.h_f / 2) + (force - flange) * (d - web / 2)
    made: Floats = np.where(whole <= outline.h_f, force * (d - whole / 2), tee)
    if outline.h_f == 0:
        made = force * (d - whole / 2)
    return np.where(A > 0, made, 0.0)


def area_for(designed: Designed, M: float, d: float, b: float) -> float:
    """Return the area of bars [mm2] that a moment M [N.mm] requires at d in a width b [mm].

    Where the concrete balances no such moment, that of the largest which it does.
    """
    s, outline = designed.strengths, designed.outline
    if M <= 0:
        return 0.0
    stress, b_w, h_f = s.alpha_1 * s.phi_c * s.f_c, outline.b_w, outline.h_f
    flange = 0.0
    if b > b_w and stress * b * h_f * (d - h_f / 2) < M:
        flange = stress * (b - b_w) * h_f
        M, b = M - flange * (d - h_f / 2), b_w
    under = max(d * d - 2 * M / (stress * b), 0.0)
    return float((flange + stress * b * (d - under**0.5)) / yield_force(designed))


@dataclass(frozen=True, eq=False, slots=True)
class Provided:
    """What stands at stations: area counted as developed, its depth, its moment resistance."""

    A: Floats
    d: Floats
    M_r: Floats


def provide(
    designed: Designed,
    standing: Iterable[Standing],
    face: Face,
    x: Floats,
    span: Sequence[int] | Floats,
) -> Provided:
    """Return what the bars of a face provide at stations x that lie in the spans named."""
    outline = designed.outline
    index = np.asarray(span, dtype=int) - 1
    h = np.array(outline.depths)[index]
    A = np.zeros_like(x)
    lever = np.zeros_like(x)
    first, last = x.min(initial=np.inf), x.max(initial=-np.inf)
    for bars in standing:
        if bars.run.face == face and bars.run.start < last and bars.run.end > first:
            part = bars.run.area * bars.developed(x)
            A += part
            lever += part * bars.distance
    d = h - np.divide(lever, A, out=np.zeros_like(x), where=A > 0)
    widths = np.array(outline.widths)[index] if face == "bottom" else np.full_like(x, outline.b_w)
    return Provided(A, d, moment_of(designed, A, d, widths))


def span_at(outline: BeamOutline, x: float) -> int:
    """Return the span that a place along the beam lies in; at an axis, the one on its right."""
    for span, end in enumerate(outline.axes[1:], start=1):
        if x < end:
            return span
    return len(outline.lengths)
