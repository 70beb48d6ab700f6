"""The top bars of a beam: over the supports in two lengths at most, and those between.

Common practice: the corner bars, and more where a third of the steel asks for it, pass the point
of inflection; the others are cut where these do alone; both alike on either side where the spans
are alike; bars of two supports that meet in a short span are one. Between them two bars hold the
stirrups, lapped with the corner bars; of the same size they are one with them.
"""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass, replace

from lineproof.beams.continuous.anchorage import development_length, value
from lineproof.beams.continuous.anchored_ends import end_hook
from lineproof.beams.continuous.cutoff import (
    MARGIN,
    STEP,
    Frame,
    Point,
    along,
    ceil50,
    continuing_length,
    depths,
    extension,
    far_face,
    full_moment,
    half_of,
    least_step,
    no_further_need,
    reach,
    support_of,
    worst_between,
    zones_at,
)
from lineproof.beams.continuous.detailing_bottom import CORNERS, placed
from lineproof.beams.continuous.detailing_data import Designed
from lineproof.beams.continuous.detailing_holders import holder, joined, with_holders
from lineproof.beams.continuous.detailing_meeting import (
    Reach,
    allowed,
    furthest,
    others_through,
    to_the_end,
    with_restraint,
)
from lineproof.beams.continuous.detailing_tension import lengthen
from lineproof.beams.continuous.detailing_tips import with_tip_hooks
from lineproof.beams.continuous.forces import ENDS, End, other
from lineproof.beams.continuous.laps import lap_length, split
from lineproof.beams.continuous.layout import BarRun
from lineproof.beams.continuous.resistance import Standing, stand
from lineproof.standards.a23_3 import cutoff as clause

ALIKE = 1.2
"""Clear spans up to this ratio beside a support have top bars alike on both sides."""
LONGEST_ALIKE = 0.7
"""Top bars alike on both sides reach at most over this part of the clear spans."""
LEAST_STEP = 300.0
"""Bars whose ends lie closer than this have one length."""
SHARE_PAST = 3.0
"""One bar in so many passes the point of inflection (12.12.2)."""


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
    supports = range(1, len(designed.outline.supports) + 1)
    reaches = {support: _reaches(frame, support) for support in supports}
    for span in range(1, len(designed.outline.lengths) + 1):
        _fill(frame, span, reaches)
    for support, each in reaches.items():
        groups = groups_of(designed, support)
        continuing = groups[: long_of(groups)]
        for side, found in each.items():
            each[side] = allowed(frame, support, side, continuing, found)
    runs = _laid(frame, reaches)
    while lengthen(frame, runs, reaches):
        runs = _laid(frame, reaches)
    return runs


def _laid(frame: Frame, reaches: Mapping[int, dict[End, Reach]]) -> tuple[BarRun, ...]:
    """Return the top bars that reach so far, and those that hold the stirrups between them."""
    designed = frame.designed
    rows = {support: _placed_all(designed, support, each) for support, each in reaches.items()}
    corners = {support: row[0] for support, row in rows.items() if row}
    others = others_through(designed, rows)
    string = joined(designed, with_holders(designed, corners))
    middles = [_middle(designed, span) for span in range(1, len(designed.outline.lengths) + 1)]
    laid = (p for run in (*string, *others) for p in split(designed, run, middles))
    return with_tip_hooks(frame, tuple(laid))


def _fill(frame: Frame, span: int, reaches: dict[int, dict[End, Reach]]) -> None:
    """Lengthen bars that meet in a span until they carry it together."""
    designed = frame.designed
    ends = [(s, e) for s, e in ((span, "right"), (span + 1, "left")) if e in reaches[s]]
    meeting = [(s, e) for s, e in ends if reaches[s][e].through]
    bounds = designed.outline.faces(span)
    length = ceil50(designed.outline.lengths[span - 1])
    while meeting:
        rows = {s: _placed_all(designed, s, reaches[s]) for s, _ in ends}
        runs = [*(row[0] for row in rows.values() if row), *others_through(designed, rows)]
        if worst_between(frame, stand(designed, runs), "top", span, bounds) <= MARGIN:
            return
        if all(reaches[s][e].short >= length for s, e in meeting):
            return
        for s, e in meeting:
            reaches[s][e] = _longer(reaches[s][e], length)


def _longer(found: Reach, length: float) -> Reach:
    """Return a reach longer by two steps: the long bars as far as the next axis, then the short."""
    if found.long < length:
        long = min(found.long + 2 * STEP, length)
        return Reach(long, long if found.short >= found.long else found.short, found.through)
    return Reach(length, min(found.short + 2 * STEP, length), found.through)


def _middle(designed: Designed, span: int) -> float:
    axis = designed.outline.axes[span - 1]
    return axis + designed.outline.lengths[span - 1] / 2 // STEP * STEP


def _reaches(frame: Frame, support: int) -> dict[End, Reach]:
    """Return how far the top bars of a support reach into the spans beside it."""
    designed = frame.designed
    groups = groups_of(designed, support)
    reaches: dict[End, Reach] = {}
    for side in ENDS:  # the side of the support that the span lies on
        if groups and designed.forces.has_span(support, side):
            span = support - 1 if side == "left" else support
            reaches[side] = _reach(frame, span, other(side), groups, long_of(groups))
    reaches = {
        side: _developed(designed, support, side, groups, found) for side, found in reaches.items()
    }
    return _alike(designed, support, reaches)


def _developed(
    designed: Designed, support: int, side: End, groups: Sequence[BarRun], found: Reach
) -> Reach:
    """Return a reach that develops the bars at both faces of their support (12.1.1)."""
    span = support - 1 if side == "left" else support
    most = designed.outline.lengths[span - 1] - designed.end_cover
    longest = max(development_length(designed, run) for run in groups)
    least = min(ceil50(half_of(designed, span, other(side)) + longest), most)
    return Reach(max(found.long, least), max(found.short, least), found.through)


def _placed_all(designed: Designed, support: int, reaches: dict[End, Reach]) -> list[BarRun]:
    """Return the top bars of a support with their ends, the corners first."""
    groups = groups_of(designed, support)
    made = []
    for index, run in enumerate(groups):
        ended = run
        for side in ENDS:
            found = reaches.get(side)
            long = index < long_of(groups)
            t = None if found is None else (found.long if long else found.short)
            ended = _end(designed, support, side, ended, t)
        made.append(ended)
    return made


def _alike(designed: Designed, support: int, reaches: dict[End, Reach]) -> dict[End, Reach]:
    """Return the reaches, the larger on both sides where the spans are alike."""
    if len(reaches) < len(ENDS):
        return reaches
    spans = (support - 1, support)
    if any(designed.cantilever(span) for span in spans):
        return reaches
    clear = [end - start for start, end in map(designed.outline.faces, spans)]
    if max(clear) > ALIKE * min(clear) or any(r.through for r in reaches.values()):
        return reaches
    long = max(r.long for r in reaches.values())
    short = max(r.short for r in reaches.values())
    if any(long > LONGEST_ALIKE * length for length in clear):
        return reaches
    return {side: Reach(long, short) for side in reaches}


def _end(designed: Designed, support: int, side: End, run: BarRun, reach: float | None) -> BarRun:
    """Return a group with its end on one side of the support; None ends it in the support."""
    axis = designed.outline.axes[support - 1]
    sign = -1.0 if side == "left" else 1.0
    if reach is not None:
        span = support - 1 if side == "left" else support
        far = support - 1 if side == "left" else support + 1
        t = to_the_end(designed, span, other(side), run, reach)
        ends = designed.exterior(far) and t >= furthest(designed, span, other(side))
        return placed(side, run, axis + sign * t, end_hook(designed, far, run) if ends else "")
    half = designed.outline.supports[support - 1].half
    x = axis + sign * (half - designed.end_cover)
    return placed(side, run, x, end_hook(designed, support, run))


def _reach(frame: Frame, span: int, near: End, groups: tuple[BarRun, ...], number: int) -> Reach:
    """Return how far long and short bars reach into a span."""
    designed = frame.designed
    most = far_face(designed, span, near)
    inflection = no_further_need(frame, "top", span, near, 0.0)
    own = max(reach(designed, span), inflection.t if inflection else 0.0)
    if designed.cantilever(span):
        long, through = designed.outline.lengths[span - 1] - designed.end_cover, False
    else:
        long, through = _long(frame, span, near, groups, inflection)
    work = Work.of(frame, (span, near), groups, number, own)
    short, past = long, long
    if number < len(groups):
        long, short = _short(work, long)
    if not through and not designed.cantilever(span):
        long, short, through = _lengthened(work, long, short, most)
    if through:
        whole = short >= long
        long = _meeting(work)
        if number > 1 and inflection is not None:
            long = max(long, past)  # the corner bars, which meet those beyond, are no third
        short = long if whole else short
    long = min(long, furthest(designed, span, near))
    found = Reach(long, min(short, long), through)
    return with_restraint(designed, span, near, groups, found)


def _lengthened(work: Work, long: float, short: float, most: float) -> tuple[float, float, bool]:
    """Return the bars longer by as much as they need; True where they reach the next support."""

    def enough(steps: int) -> bool:
        added = steps * STEP
        return _worst(work, (long + added, short + added if short == long else short)) <= MARGIN

    steps = least_step(max(int((most - long) // STEP) + 1, 1), enough)
    if steps is None:
        return long, short, True
    added = steps * STEP
    return long + added, short + added if short == long else short, long + added >= most


def _meeting(work: Work) -> float:
    """Return where bars end that meet those of the next support: past midspan by half a lap.

    They go on to where the long bars of the next support do alone, if that is further: its short
    ones may end before.
    """
    designed, span, near = work.frame.designed, work.span, work.near
    length = designed.outline.lengths[span - 1]
    lap = max(lap_length(designed, run) for run in work.groups)
    t = ceil50(length / 2 + lap / 2)
    beyond = groups_of(designed, support_of(span, other(near)))
    beyond = beyond[: long_of(beyond)]
    point = no_further_need(
        work.frame, "top", span, near, full_moment(designed, "top", span, beyond)
    )
    if point is None:
        return max(t, ceil50(length))
    d_b = max(run.diameter for run in work.groups)
    return max(t, ceil50(point.t + extension(designed, "top", span, near, point.t, d_b)))


@dataclass(frozen=True, eq=False, slots=True)
class Work:
    """Top bars of a support while their reach into a span is sought.

    The first ``number`` groups are long; ``own`` is the part of the span, from the axis of the
    support, in which its bars carry the moment.
    """

    frame: Frame
    span: int
    near: End
    groups: tuple[BarRun, ...]
    number: int
    own: float
    standing: tuple[Standing, ...]
    holder: Standing | None

    @classmethod
    def of(
        cls,
        frame: Frame,
        place: tuple[int, End],
        groups: tuple[BarRun, ...],
        number: int,
        own: float,
    ) -> Work:
        """Return the work at a span and the near support, with the bars as far as they stand."""
        designed, (span, near) = frame.designed, place
        support, side = support_of(span, near), other(near)
        runs = []
        for run in groups:
            there = placed(side, run, along(designed, span, near, own))
            if designed.forces.has_span(support, near):
                far = along(designed, span, near, -2 * designed.stock)
                runs.append(placed(near, there, far))
            else:
                runs.append(_end(designed, support, near, there, None))
        held = None
        if not designed.cantilever(span):
            held = stand(designed, [holder(designed, span, near, own)])[0]
        standing = tuple(stand(designed, [run])[0] for run in runs)
        return cls(frame, span, near, groups, number, own, standing, held)


def past_inflection(designed: Designed, span: int, near: End, d_b: float) -> float:
    """Return the least extension past the point of inflection (12.12.2)."""
    start, end = designed.outline.faces(span)
    d, _ = depths(designed, "top", span, near)
    return value(clause.LENGTH_PAST_INFLECTION, d=d, d_b=d_b, l_n=end - start)


def _long(
    frame: Frame, span: int, near: End, groups: Sequence[BarRun], point: Point | None
) -> tuple[float, bool]:
    """Return where the long bars end; True where they meet those of the next support."""
    designed = frame.designed
    if point is None:
        return designed.outline.lengths[span - 1] / 2, True
    d_b = max(run.diameter for run in groups)
    past = max(
        past_inflection(designed, span, near, d_b),
        extension(designed, "top", span, near, point.t, d_b),
    )
    t = ceil50(point.t + past)
    return t, t >= far_face(designed, span, near)


def _short(work: Work, long: float) -> tuple[float, float]:
    """Return where long and short bars end."""
    frame, span, near = work.frame, work.span, work.near
    designed = frame.designed
    continuing = list(work.groups[: work.number])
    M_r = full_moment(designed, "top", span, continuing)
    point = no_further_need(frame, "top", span, near, M_r)
    if point is None:
        return long, long
    d_b = max(run.diameter for run in work.groups[work.number :])
    short = ceil50(point.t + extension(designed, "top", span, near, point.t, d_b))
    past = continuing_length(designed, "top", span, near, continuing)
    if not designed.cantilever(span):
        long = max(long, ceil50(point.t + past))
    elif long - point.t < past:
        return long, long

    def enough(steps: int) -> bool:
        return _worst(work, (long, short + steps * STEP)) <= MARGIN

    count = int(-((short - long + LEAST_STEP) // STEP))
    first = least_step(count, enough)
    if first is None:
        return long, long
    places = [short + steps * STEP for steps in range(first, count)]
    zones = zones_at(designed, "top", span, near, places, continuing)
    return long, next((t for t, zone in zip(places, zones, strict=True) if zone), long)


def _worst(work: Work, reaches: tuple[float, float]) -> float:
    """Return the worst ratio of these bars and those that hold the stirrups, in their part."""
    designed, span, near = work.frame.designed, work.span, work.near
    side = other(near)
    bars = []
    for index, standing in enumerate(work.standing):
        t = reaches[0] if index < work.number else reaches[1]
        run = placed(side, standing.run, along(designed, span, near, t))
        bars.append(replace(standing, run=run))
    if work.holder is not None:
        held = holder(designed, span, near, reaches[0])
        if held.size == bars[0].run.size:  # they will be one bar with the corners
            far = held.end if side == "right" else held.start
            bars[0] = replace(bars[0], run=placed(side, bars[0].run, far))
        else:
            bars.append(replace(work.holder, run=held))
    half = half_of(designed, span, near)
    x = sorted(along(designed, span, near, t) for t in (half, work.own))
    return worst_between(work.frame, bars, "top", span, (x[0], x[1]))
