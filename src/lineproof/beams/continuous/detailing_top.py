"""The top bars of a beam: over the supports in two lengths at most, and those between.

Common practice: the corner bars, and more where a third of the steel asks for it, pass the point
of inflection; the others are cut where these do alone; both alike on either side where the spans
are alike. Between them two bars hold the stirrups, lapped with the corner bars; of the same size
they are one with them.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, replace

from lineproof.beams.continuous.anchorage import available, bar_of, develop, has_hooks, value
from lineproof.beams.continuous.cutoff import (
    MARGIN,
    STEP,
    Frame,
    Point,
    along,
    axis_of,
    ceil50,
    continuing_length,
    depths,
    extension,
    full_moment,
    half_of,
    no_further_need,
    reach,
    support_of,
    worst_between,
    zone_at,
)
from lineproof.beams.continuous.detailing_bottom import CORNERS, SIDES
from lineproof.beams.continuous.detailing_data import Designed
from lineproof.beams.continuous.forces import End, other
from lineproof.beams.continuous.laps import lap_length, split
from lineproof.beams.continuous.layout import BarRun, Hook
from lineproof.beams.continuous.resistance import span_at
from lineproof.standards.a23_3 import cutoff as clause

ALIKE = 1.2
"""Clear spans up to this ratio beside a support have top bars alike on both sides."""
LEAST_STEP = 300.0
"""Bars whose ends lie closer than this have one length."""
SHARE_PAST = 3.0
"""One bar in so many passes the point of inflection (12.12.2)."""


@dataclass(frozen=True, slots=True)
class Reach:
    """How far long and short bars reach into a span, from the axis of their support.

    ``through`` says that the long bars meet those of the next support: there is no point of
    inflection between.
    """

    long: float
    short: float
    through: bool = False


def groups_of(designed: Designed, support: int) -> tuple[BarRun, ...]:
    """Return the top bars of a support in groups, without their ends; corners first."""
    top = designed.bars.top[support - 1]
    if not top.web:
        return ()
    first, x = top.web[0], designed.outline.axes[support - 1]
    made = [BarRun("top", 1, CORNERS, first.size, x, x)]
    if first.number > CORNERS:
        made.append(BarRun("top", 1, first.number - CORNERS, first.size, x, x))
    made += [BarRun("top", 2, layer.number, layer.size, x, x) for layer in top.web[1:]]
    if top.overhang:
        made.append(BarRun("top", 1, top.overhang, first.size, x, x, place="overhang"))
    return tuple(replace(run, serves=f"support {support}") for run in made)


def long_of(groups: Sequence[BarRun]) -> int:
    """Return how many groups, from the corners on, are a third of the steel."""
    A_s = sum(run.area for run in groups)
    number, area = 0, 0.0
    while number < len(groups) and area * SHARE_PAST < A_s * (1 - 1e-12):
        area += groups[number].area
        number += 1
    return number


def lay_top(frame: Frame) -> tuple[BarRun, ...]:
    """Return all top bars of a beam."""
    designed = frame.designed
    made: list[BarRun] = []
    corners: dict[int, BarRun] = {}
    for support in range(1, len(designed.outline.supports) + 1):
        runs = _lay_support(frame, support)
        if runs:
            corners[support] = runs[0]
            made += runs[1:]
    string = _joined(designed, _with_holders(designed, corners))
    middles = [_middle(designed, k) for k in range(1, len(designed.outline.lengths) + 1)]
    pieces = [piece for run in (*string, *made) for piece in split(designed, run, middles)]
    return tuple(pieces)


def _middle(designed: Designed, span: int) -> float:
    axis = designed.outline.axes[span - 1]
    return axis + designed.outline.lengths[span - 1] / 2 // STEP * STEP


def _lay_support(frame: Frame, support: int) -> list[BarRun]:
    designed = frame.designed
    groups = groups_of(designed, support)
    if not groups:
        return []
    number = long_of(groups)
    reaches: dict[End, Reach] = {}
    for side in SIDES:  # the side of the support that the span lies on
        if designed.forces.has_span(support, side):
            span = support - 1 if side == "left" else support
            reaches[side] = _reach(frame, span, other(side), groups, number)
    reaches = _alike(designed, support, reaches)
    made = []
    for index, run in enumerate(groups):
        ended = run
        for side in SIDES:
            found = reaches.get(side)
            t = None if found is None else (found.long if index < number else found.short)
            ended = _end(designed, support, side, ended, t)
        made.append(ended)
    return made


def _alike(designed: Designed, support: int, reaches: dict[End, Reach]) -> dict[End, Reach]:
    """Return the reaches, the larger on both sides where the spans are alike."""
    if len(reaches) < len(SIDES):
        return reaches
    spans = (support - 1, support)
    if any(designed.cantilever(span) for span in spans):
        return reaches
    clear = [end - start for start, end in map(designed.outline.faces, spans)]
    if max(clear) > ALIKE * min(clear) or any(r.through for r in reaches.values()):
        return reaches
    long = max(r.long for r in reaches.values())
    short = max(r.short for r in reaches.values())
    if any(long > designed.outline.lengths[span - 1] / 2 for span in spans):
        return reaches
    return {side: Reach(long, short) for side in reaches}


def _end(designed: Designed, support: int, side: End, run: BarRun, reach: float | None) -> BarRun:
    """Return a group with its end on one side of the support; None ends it in the support."""
    axis = designed.outline.axes[support - 1]
    sign = -1.0 if side == "left" else 1.0
    if reach is not None:
        return _placed(side, run, axis + sign * reach)
    half = designed.outline.supports[support - 1].half
    x = axis + sign * (half - designed.end_cover)
    return _placed(side, run, x, end_hook(designed, support, run))


def _placed(side: End, run: BarRun, x: float, hook: Hook = "") -> BarRun:
    if side == "left":
        return replace(run, start=x, hook_start=hook)
    return replace(run, end=x, hook_end=hook)


def end_hook(designed: Designed, support: int, run: BarRun) -> Hook:
    """Return the hook of top bars at an end support: none where they develop straight."""
    l_d = develop(designed.basis, bar_of(designed, run)).l_d
    if l_d <= available(designed, support) or not has_hooks(designed):
        return ""
    return "90"


def _reach(frame: Frame, span: int, near: End, groups: tuple[BarRun, ...], number: int) -> Reach:
    """Return how far long and short bars reach into a span."""
    designed = frame.designed
    if designed.cantilever(span):
        long, through = designed.outline.lengths[span - 1] - designed.end_cover, False
    else:
        long, through = _long(frame, span, near, groups)
    short = long
    if number < len(groups):
        long, short = _short(frame, span, near, groups, number, long)
    while not through and not designed.cantilever(span):
        if _worst(frame, span, near, groups, number, (long, short)) <= MARGIN:
            break
        short = short + STEP if short == long else short
        long += STEP
        through = long >= designed.outline.lengths[span - 1] / 2
    if through:
        lap = lap_length(designed, groups[0])
        long = ceil50(designed.outline.lengths[span - 1] / 2 + lap / 2)
    return Reach(long, min(short, long), through)


def past_inflection(designed: Designed, span: int, near: End, d_b: float) -> float:
    """Return the least extension past the point of inflection (12.12.2)."""
    start, end = designed.outline.faces(span)
    d, _ = depths(designed, "top", span, near)
    return value(clause.LENGTH_PAST_INFLECTION, d=d, d_b=d_b, l_n=end - start)


def _long(frame: Frame, span: int, near: End, groups: Sequence[BarRun]) -> tuple[float, bool]:
    """Return where the long bars end; True where they meet those of the next support."""
    designed = frame.designed
    point = no_further_need(frame, "top", span, near, 0.0)
    if point is None:
        return designed.outline.lengths[span - 1] / 2, True
    d_b = max(run.diameter for run in groups)
    past = max(
        past_inflection(designed, span, near, d_b),
        extension(designed, "top", span, near, point.t, d_b),
    )
    t = ceil50(point.t + past)
    return t, t >= designed.outline.lengths[span - 1] / 2


def _short(
    frame: Frame, span: int, near: End, groups: Sequence[BarRun], number: int, long: float
) -> tuple[float, float]:
    """Return where long and short bars end."""
    designed = frame.designed
    continuing = list(groups[:number])
    point: Point | None = no_further_need(
        frame, "top", span, near, full_moment(designed, "top", span, continuing)
    )
    if point is None:
        return long, long
    d_b = max(run.diameter for run in groups[number:])
    short = ceil50(point.t + extension(designed, "top", span, near, point.t, d_b))
    if not designed.cantilever(span):
        past = continuing_length(designed, "top", span, near, continuing)
        long = max(long, ceil50(point.t + past))
    while short < long - LEAST_STEP:
        allowed = zone_at(designed, "top", span, near, short, continuing)
        if allowed and _worst(frame, span, near, groups, number, (long, short)) <= MARGIN:
            return long, short
        short += STEP
    return long, long


def _worst(
    frame: Frame,
    span: int,
    near: End,
    groups: Sequence[BarRun],
    number: int,
    reaches: tuple[float, float],
) -> float:
    """Return the worst ratio of these bars and those that hold the stirrups, as far as midspan."""
    designed = frame.designed
    support = support_of(span, near)
    side = other(near)
    runs = []
    for index, run in enumerate(groups):
        t = reaches[0] if index < number else reaches[1]
        there = _placed(side, run, along(designed, span, near, t))
        if designed.forces.has_span(support, near):
            far = along(designed, span, near, -2 * designed.stock)
            runs.append(_placed(near, there, far))
        else:
            runs.append(_end(designed, support, near, there, None))
    if not designed.cantilever(span):
        runs.append(_holder(designed, span, near, reaches[0]))
    half = half_of(designed, span, near)
    x = sorted(along(designed, span, near, t) for t in (half, reach(designed, span)))
    return worst_between(frame, runs, "top", span, (x[0], x[1]))


def _holder(designed: Designed, span: int, near: End, t: float) -> BarRun:
    """Return the bars that hold the stirrups from one support's corner bars to beyond midspan."""
    far = designed.outline.lengths[span - 1]
    bare = BarRun("top", 1, CORNERS, designed.bars.holders, 0.0, 0.0, serves="holds the stirrups")
    lap = _holder_lap(designed, span)
    x = sorted(along(designed, span, near, at) for at in (t - lap, max(far, t + 2 * lap)))
    return replace(bare, start=x[0], end=x[1])


def _holder_lap(designed: Designed, span: int) -> float:
    axes = designed.outline.axes
    whole = BarRun("top", 1, CORNERS, designed.bars.holders, axes[span - 1] + 1, axes[span] - 1)
    return lap_length(designed, whole)


def _with_holders(designed: Designed, corners: dict[int, BarRun]) -> list[BarRun]:
    """Return corner bars and the bars that hold the stirrups between, from left to right."""
    made: list[BarRun] = []
    for span in range(1, len(designed.outline.lengths) + 1):
        if span in corners:
            made.append(corners[span])
        if not designed.cantilever(span):
            held = _between(designed, span, corners.get(span), corners.get(span + 1))
            made += [held] if held is not None else []
        elif span not in corners and span + 1 not in corners:
            made.append(_bare(designed, span))
    last = len(designed.outline.supports)
    return [*made, corners[last]] if last in corners else made


def _bare(designed: Designed, span: int) -> BarRun:
    start, end = (
        _outer(designed, span, near) if span in (1, len(designed.outline.lengths)) else 0.0
        for near in SIDES
    )
    return BarRun("top", 1, CORNERS, designed.bars.holders, start, end, serves="holds the stirrups")


def _outer(designed: Designed, span: int, near: End) -> float:
    """Return where bars without top bars at a support start: its end cover, or its axis."""
    support = support_of(span, near)
    if support in (1, len(designed.outline.supports)):
        t = designed.end_cover - half_of(designed, span, near)
        return along(designed, span, near, t)
    return axis_of(designed, span, near)


def _between(
    designed: Designed, span: int, left: BarRun | None, right: BarRun | None
) -> BarRun | None:
    """Return the bars that hold the stirrups of a span; None where the top bars meet."""
    lap = _holder_lap(designed, span)
    start = left.end if left else _outer(designed, span, "left")
    end = right.start if right else _outer(designed, span, "right")
    if left and right and end - start < 2 * lap:
        return None
    return BarRun(
        "top", 1, CORNERS, designed.bars.holders, start - (lap if left else 0.0),
        end + (lap if right else 0.0), serves="holds the stirrups",
    )  # fmt: skip


def _joined(designed: Designed, string: list[BarRun]) -> list[BarRun]:
    """Return the corner string: like bars made one, others lapped."""
    made: list[BarRun] = []
    for run in string:
        if made and made[-1].size == run.size:
            serves = _serving(made[-1].serves, run.serves)
            made[-1] = replace(made[-1], end=run.end, hook_end=run.hook_end, serves=serves)
        elif made:
            made += _lapped(designed, made.pop(), run)
        else:
            made.append(run)
    return made


def _serving(first: str, second: str) -> str:
    parts = [p for text in (first, second) for p in text.split(", ")]
    return ", ".join(dict.fromkeys(parts))


def _lapped(designed: Designed, before: BarRun, after: BarRun) -> list[BarRun]:
    """Return two runs of different bars with the lap of the thinner between them."""
    thin = min(before, after, key=lambda run: run.diameter)
    span = span_at(designed.outline, (before.end + after.start) / 2)
    lap = lap_length(designed, replace(thin, start=designed.outline.axes[span - 1] + 1))
    short = lap - (before.end - after.start)
    if short > 0:
        before = replace(before, end=before.end + ceil50(short / 2))
        after = replace(after, start=after.start - ceil50(short / 2))
    return [before, after]
