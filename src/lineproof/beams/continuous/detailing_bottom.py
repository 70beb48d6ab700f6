"""The bottom bars of a beam: which run into the supports, which are cut, how they end.

Common practice: the two corner bars run through every span and its supports, lapped there where
the stock ends; the inner bars of the first layer and those of the second are cut where what is
left does alone, each at one place a side, unless they save little or must run into the support.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, replace
from itertools import groupby, pairwise
from operator import itemgetter

import numpy as np

from lineproof.beams.bars import BarLayers
from lineproof.beams.continuous.anchorage import (
    available,
    development_length,
    holds,
    hook_at,
    hook_part,
    value,
)
from lineproof.beams.continuous.cutoff import (
    MARGIN,
    STEP,
    Frame,
    Point,
    along,
    axis_of,
    continuing_length,
    extension,
    floor50,
    full_moment,
    half_of,
    least_step,
    local,
    no_further_need,
    sag_at,
    support_of,
    worst_between,
    zones_at,
)
from lineproof.beams.continuous.cutoff_ends import held_at_zero
from lineproof.beams.continuous.detailing_data import Designed
from lineproof.beams.continuous.detailing_through import going_past, run_through
from lineproof.beams.continuous.forces import ENDS, End
from lineproof.beams.continuous.laps import lap_between, split
from lineproof.beams.continuous.layout import BarRun, Hook
from lineproof.beams.continuous.resistance import stand, yield_force
from lineproof.beams.continuous.resistance_demand import SpanDemand, demand_at, end_tension
from lineproof.standards.a23_3 import cutoff as clause

CORNERS = 2
"""Bars in the corners of the stirrups, which run through."""
INTO_SUPPORT = 150.0
"""Length of bottom bars inside an interior support [mm] (12.11.1)."""
LEAST_SAVED = 500.0
"""Bars are cut only where a cut saves this length at that end [mm]."""


@dataclass(frozen=True, slots=True)
class Anchored:
    """How bottom bars end at a support: how many groups run in with the corners, with which hook.

    The groups are, in order, the inner bars of the first layer and the second layer.
    """

    running_in: int
    hook: Hook = ""


def groups_of(layers: BarLayers) -> tuple[BarRun, ...]:
    """Return the bars of a span in groups, without their ends: corners, inner bars, layer 2."""
    first = layers[0]
    made = [BarRun("bottom", 1, CORNERS, first.size, 0.0, 0.0)]
    if first.number > CORNERS:
        made.append(BarRun("bottom", 1, first.number - CORNERS, first.size, 0.0, 0.0))
    made += [BarRun("bottom", 2, layer.number, layer.size, 0.0, 0.0) for layer in layers[1:]]
    return tuple(made)


def lay_bottom(frame: Frame) -> tuple[BarRun, ...]:
    """Return all bottom bars of a beam."""
    designed = frame.designed
    spans = range(1, len(designed.outline.lengths) + 1)
    rows = [_lay_span(frame, span) for span in spans]
    corners = _joined(designed, [row[0] for row in rows])
    places = designed.outline.axes[1:-1]
    quarters = [x for span in spans for x in _quarters(designed, span)]
    made = [piece for run in corners for piece in split(designed, run, places, quarters)]
    for run in _others_through(designed, [row[1:] for row in rows]):
        made += split(designed, run, places, quarters)
    return tuple(made)


def _others_through(designed: Designed, rows: Sequence[Sequence[BarRun]]) -> list[BarRun]:
    """Return the other bars of all spans; like ones that would pass each other run through.

    Over a support narrower than twice :data:`INTO_SUPPORT` the bars of both spans end beyond its
    axis: side by side there would be more of them than fit into a layer. Where the soffit steps
    each keep their ends. ``rows`` has an item a span.
    """
    level = groupby(zip(designed.outline.depths, rows, strict=True), key=itemgetter(0))
    return [
        run
        for _, spans in level
        for run in run_through([row for _, row in spans], _pass, _both)
    ]  # fmt: skip


def _pass(first: BarRun, second: BarRun) -> bool:
    """Tell whether bars of two neighbouring spans overlap."""
    return second.start < first.end


def _quarters(designed: Designed, span: int) -> tuple[float, float]:
    """Return the quarter points of a clear span, where laps of bottom bars do least harm."""
    start, end = designed.outline.faces(span)
    quarter = (end - start) / 4 // STEP * STEP
    return start + quarter, end - quarter


def _lay_span(frame: Frame, span: int) -> tuple[BarRun, ...]:
    """Return the bars of one span, the corners first; the corners end as if they stood alone."""
    designed = frame.designed
    groups = groups_of(designed.bars.bottom[span - 1])
    groups = tuple(replace(run, serves=f"span {span}") for run in groups)
    ends = {near: _anchored(designed, span, near, groups) for near in ENDS}
    past = {near: going_past(designed, span, near, groups) for near in ENDS}
    runs = list(groups)
    for near in ENDS:
        t = support_end(designed, span, near)
        runs = [_ended(designed, span, near, run, t, ends[near].hook) for run in runs]
        for index in range(1, past[near] + 1):
            beyond = floor50(-development_length(designed, runs[index]))
            runs[index] = _ended(designed, span, near, runs[index], beyond)
    if designed.cantilever(span):
        return tuple(runs)
    for near in ENDS:
        runs = _cut_side(frame, span, near, runs, max(ends[near].running_in, past[near]))
    return tuple(runs)


def support_end(designed: Designed, span: int, near: End) -> float:
    """Return where bars that run into a support end, from its axis: negative beyond the axis."""
    support = support_of(span, near)
    half = half_of(designed, span, near)
    if not designed.held(support):
        return designed.end_cover
    if designed.exterior(support):
        return designed.end_cover - half
    return floor50(half - INTO_SUPPORT)


def _ended(
    designed: Designed, span: int, near: End, run: BarRun, t: float, hook: Hook = ""
) -> BarRun:
    return placed(near, run, along(designed, span, near, t), hook)


def placed(side: End, run: BarRun, x: float, hook: Hook = "") -> BarRun:
    """Return a run whose end on one side stands at x from the axis of support 1 [mm]."""
    if side == "left":
        return replace(run, start=x, hook_start=hook)
    return replace(run, end=x, hook_end=hook)


def _anchored(designed: Designed, span: int, near: End, groups: Sequence[BarRun]) -> Anchored:
    """Return how the bars end: as few as hold, straight before hooked.

    Where torsion counts all of them run in (common practice for edge beams).
    """
    support = support_of(span, near)
    if not designed.held(support):
        return Anchored(len(groups))
    first = len(groups) - 1 if span in designed.torsion else 0
    numbers = range(first, len(groups))
    if not designed.exterior(support):
        return next(
            (
                Anchored(n) for n in numbers[:-1]
                if _share(designed, support, groups, n)
                and _held_at_zero(designed, span, near, groups[: n + 1])
            ),
            Anchored(len(groups) - 1),
        )  # fmt: skip
    sizes = {run.size for run in groups}
    hooked = all(hook_part(designed, support, size) > 0 for size in sizes)
    hooks: tuple[Hook, ...] = ("", "90") if hooked else ("",)
    for hook in hooks:
        for n in numbers:
            if _share(designed, support, groups, n) and _held(
                designed, span, near, groups, n, hook
            ):
                return Anchored(n, hook)
    return Anchored(len(groups) - 1, hooks[-1])


def _share(designed: Designed, support: int, groups: Sequence[BarRun], n: int) -> bool:
    """Tell whether enough of the bars run in: a third at simple ends, else a quarter (12.11.1)."""
    test = clause.INTO_CONTINUOUS_SUPPORT
    if designed.exterior(support) and designed.outline.supports[support - 1].kind == "simple":
        test = clause.INTO_SIMPLE_SUPPORT
    A_s = sum(run.area for run in groups)
    return holds(test, A_s=A_s, A_se=sum(run.area for run in groups[: n + 1]))


def _held(
    designed: Designed, span: int, near: End, groups: Sequence[BarRun], n: int, hook: Hook
) -> bool:
    """Tell whether the bars that run in carry 11.3.9.5 and 12.11.3 at an end support."""
    support = support_of(span, near)
    inside = groups[: n + 1]
    l_av = available(designed, support)
    lengths = [
        hook_at(designed, support, run.size).l_dh if hook
        else development_length(designed, replace(run, start=0.0, end=1.0))
        for run in inside
    ]  # fmt: skip
    parts = [min(l_av / length, 1.0) for length in lengths]
    A_sd = sum(run.area * part for run, part in zip(inside, parts, strict=True))
    if A_sd * yield_force(designed) < face_tension(designed, span, near):
        return False
    if designed.outline.supports[support - 1].kind != "simple":
        return _held_at_zero(designed, span, near, inside)
    return max(lengths) <= limit_at_support(designed, span, near, inside)


def _held_at_zero(designed: Designed, span: int, near: End, inside: Sequence[BarRun]) -> bool:
    return held_at_zero(designed, span, near, inside, support_end(designed, span, near))


def face_tension(designed: Designed, span: int, near: End) -> float:
    """Return the tension of the bottom bars at the face of an end support [N]."""
    at = face_demand(designed, span, near)
    return max(
        float(at.bottom.F[0]), end_tension(designed, support_of(span, near)),
        _turned_at_face(designed, span, near),
    )  # fmt: skip


def _turned_at_face(designed: Designed, span: int, near: End) -> float:
    """Return the tension with torsion of the cases whose section of shear is the face itself [N].

    So it is where the support pulls the beam down, and the bottom may be in tension there.
    """
    turned = designed.torsion.get(span)
    if turned is None:
        return 0.0
    face = local(designed, span, near, half_of(designed, span, near))
    here = np.abs(turned.sections - face) < 1.0
    return float(turned.by_case[0].max(initial=0.0, where=here))


def face_demand(designed: Designed, span: int, near: End) -> SpanDemand:
    """Return what the bars of a span carry at the face of a support."""
    half = half_of(designed, span, near)
    return demand_at(designed, span, np.array([local(designed, span, near, half)]))


def limit_at_support(designed: Designed, span: int, near: End, inside: Sequence[BarRun]) -> float:
    """Return the largest development length of 12.11.3 at a simple support."""
    V_f, confined = support_shear(designed, span, near)
    l_a = value(
        clause.PAST_CENTRE, b_sp=designed.outline.supports[support_of(span, near) - 1].width,
        c_end=designed.end_cover,
    )  # fmt: skip
    formula = clause.LIMIT_CONFINED if confined else clause.LIMIT
    return value(formula, M_r=full_moment(designed, "bottom", span, inside), V_f=V_f, l_a=l_a)


def support_shear(designed: Designed, span: int, near: End) -> tuple[float, bool]:
    """Return the largest shear at a support axis, and whether a reaction confines the ends.

    It does where the beam is carried from below and no case lifts it.
    """
    x = 0.0 if near == "left" else designed.outline.lengths[span - 1]
    _, V = designed.forces.pairs(span, x, "right" if near == "left" else "left")
    upward = V if near == "left" else -V
    direct = designed.outline.supports[support_of(span, near) - 1].carrier in ("column", "wall")
    return float(abs(V).max()), bool(direct and upward.min() >= 0)


def _cut_side(
    frame: Frame, span: int, near: End, runs: list[BarRun], running_in: int
) -> list[BarRun]:
    """Return the runs with those groups cut at one end that may be: layer 2, then inner bars."""
    made, earlier = list(runs), None
    for index in range(len(runs) - 1, running_in, -1):
        continuing = [run for i, run in enumerate(made) if i < index]
        found = _cut(frame, span, near, made, index, continuing, earlier)
        if found is None:
            break
        made[index], earlier = found
    return made


def _cut(
    frame: Frame,
    span: int,
    near: End,
    runs: list[BarRun],
    index: int,
    continuing: list[BarRun],
    earlier: Point | None,
) -> tuple[BarRun, Point] | None:
    """Return one group cut, with its point of no further need; None where it shall run in."""
    designed, run = frame.designed, runs[index]
    point = no_further_need(
        frame, "bottom", span, near, full_moment(designed, "bottom", span, continuing)
    )
    if point is None or _too_short_beyond(designed, span, near, point.t, continuing):
        return None
    t = floor50(point.t - extension(designed, "bottom", span, near, point.t, run.diameter))
    if earlier is not None:
        t = min(t, floor50(earlier.t - continuing_length(designed, "bottom", span, near, [run])))
    half = half_of(designed, span, near)
    middle = sag_at(designed, span)
    face = axis_of(designed, span, near) + (half if near == "left" else -half)
    bounds = (min(face, middle), max(face, middle))

    def tried(steps: int) -> BarRun:
        return _ended(designed, span, near, run, t - steps * STEP)

    standing = stand(designed, runs)

    def enough(steps: int) -> bool:
        moved = replace(standing[index], run=tried(steps))
        made = (*standing[:index], moved, *standing[index + 1 :])
        return worst_between(frame, made, "bottom", span, bounds) <= MARGIN

    count = int((t - half + INTO_SUPPORT - LEAST_SAVED) // STEP) + 1
    first = least_step(count, enough)
    if first is None:
        return None
    places = [t - steps * STEP for steps in range(first, count)]
    zones = zones_at(designed, "bottom", span, near, places, continuing)
    return next(((tried(first + i), point) for i, zone in enumerate(zones) if zone), None)


def _too_short_beyond(
    designed: Designed, span: int, near: End, t: float, continuing: Sequence[BarRun]
) -> bool:
    """Tell whether bars that go on past t end in an end support before 12.10.4 lets others end."""
    if not designed.exterior(support_of(span, near)):
        return False
    length = continuing_length(designed, "bottom", span, near, continuing)
    return t - support_end(designed, span, near) < length


def _joined(designed: Designed, corners: list[BarRun]) -> list[BarRun]:
    """Return the corner bars of all spans: like bars run through, others are lapped.

    Where the depth changes they stand at different heights: each ends by itself.
    """
    made = [corners[0]]
    for (span, before), (_, after) in pairwise(enumerate(corners, start=1)):
        axis = designed.outline.axes[span]
        if designed.outline.depths[span - 1] != designed.outline.depths[span]:
            made[-1] = _into_step(designed, span, "right", made[-1])
            made.append(_into_step(designed, span + 1, "left", after))
            continue
        if before.size == after.size:
            made[-1] = replace(
                made[-1], end=after.end, hook_end=after.hook_end, serves=_both(made[-1], after)
            )
            continue
        small = min(before, after, key=lambda run: run.diameter)
        large = after if small is before else before
        met = [replace(run, start=axis - 1, end=axis + 1) for run in (small, large)]
        half = lap_between(designed, *met) / 2
        made[-1] = replace(made[-1], end=axis + half)
        made.append(replace(after, start=axis - half))
    return made


def _into_step(designed: Designed, span: int, near: End, run: BarRun) -> BarRun:
    """Return corner bars ended at a support where the soffit steps.

    Those of the deeper span reach the far side of the support; the others run on into the deeper
    concrete until they are developed at their face.
    """
    half = half_of(designed, span, near)
    beside = span - 1 if near == "left" else span + 1
    t = designed.end_cover - half
    if designed.outline.depths[span - 1] < designed.outline.depths[beside - 1]:
        l_d = development_length(designed, run)
        t = min(t, floor50(half - l_d))
    return _ended(designed, span, near, run, t)


def _both(before: BarRun, after: BarRun) -> str:
    first = before.serves.removeprefix("spans ").removeprefix("span ").split(" ")[0]
    return f"spans {first} to {after.serves.rpartition(' ')[2]}"
