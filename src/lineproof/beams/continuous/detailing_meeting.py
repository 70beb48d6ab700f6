"""How far the top bars of a support reach; those of two supports that meet are one."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass, replace

from lineproof.beams.continuous.anchorage import (
    available,
    development_length,
    fits_hook,
)
from lineproof.beams.continuous.cutoff import (
    STEP,
    Frame,
    ceil50,
    continuing_length,
    far_face,
    full_moment,
    half_of,
    no_further_need,
    support_of,
    zones_at,
)
from lineproof.beams.continuous.detailing_data import Designed
from lineproof.beams.continuous.detailing_holders import serving
from lineproof.beams.continuous.detailing_through import run_through
from lineproof.beams.continuous.forces import End, other
from lineproof.beams.continuous.laps import lap_length
from lineproof.beams.continuous.layout import BarRun
from lineproof.beams.continuous.resistance import section_depth, shear_depth

BESIDE = 300.0
"""Bars that would end so near the face of an end support, or beyond it, run in [mm]."""


@dataclass(frozen=True, slots=True)
class Reach:
    """How far long and short bars reach into a span, from the axis of their support.

    ``through`` says that the long bars meet those of the next support: there is no point of
    inflection between.
    """

    long: float
    short: float
    through: bool = False


def with_restraint(
    designed: Designed, span: int, near: End, groups: Sequence[BarRun], found: Reach
) -> Reach:
    """Return a reach that is enough at an end whose restraint is assumed.

    There all bars reach a quarter of the clear span past the face (common practice), and are
    developed at the section of shear beside it.
    """
    support = support_of(span, near)
    if support not in designed.restrained:
        return found
    start, end = designed.outline.faces(span)
    l_d = max(development_length(designed, run) for run in groups)
    h = designed.outline.depths[span - 1]
    d_v = shear_depth(section_depth(designed, "top", span, support), h)
    least = ceil50(half_of(designed, span, near) + max((end - start) / 4, d_v + l_d))
    most = designed.outline.lengths[span - 1]
    return Reach(
        max(found.long, min(least, most)), max(found.short, min(least, most)), found.through
    )


def allowed(
    frame: Frame, support: int, side: End, continuing: Sequence[BarRun], found: Reach
) -> Reach:
    """Return a reach with the short bars as far as they may end in a tension zone (12.10.5).

    Bars made longer for another reason may have left the place that was found for their end. Where
    the beam ends before the long bars are as long as 12.10.4 asks, all run to its end.
    """
    designed, span = frame.designed, support - 1 if side == "left" else support
    if _too_near_the_end(frame, span, other(side), continuing):
        end = furthest(designed, span, other(side))
        return replace(found, long=end, short=end)
    places = [found.short]
    while places[-1] + STEP < found.long:
        places.append(places[-1] + STEP)
    zones = zones_at(designed, "top", span, other(side), places, continuing)
    short = next((t for t, zone in zip(places, zones, strict=True) if zone), found.long)
    return replace(found, short=short)


def _too_near_the_end(frame: Frame, span: int, near: End, continuing: Sequence[BarRun]) -> bool:
    """Tell whether the beam ends before bars that go on past a cut are long enough (12.10.4)."""
    designed = frame.designed
    M_r = full_moment(designed, "top", span, continuing)
    point = no_further_need(frame, "top", span, near, M_r)
    if point is None or point.t <= half_of(designed, span, near):
        return False  # no bars are cut in the span, or those that are serve the one behind
    past = continuing_length(designed, "top", span, near, continuing)
    return point.t + past > furthest(designed, span, near)


def furthest(designed: Designed, span: int, near: End) -> float:
    """Return how far bars can reach: past the far axis, at the end of the beam into the support."""
    length = designed.outline.lengths[span - 1]
    far = support_of(span, other(near))
    if far not in (1, len(designed.outline.supports)):
        return length * 2
    return length + designed.outline.supports[far - 1].half - designed.end_cover


def to_the_end(designed: Designed, span: int, near: End, run: BarRun, t: float) -> float:
    """Return where bars end that reach so far: in an end support as far as they can go.

    There they are hooked like the top bars of that support (common practice), if they can be
    anchored in it.
    """
    support = support_of(span, other(near))
    beside = t > far_face(designed, span, near) - BESIDE
    if beside and designed.exterior(support) and _anchors(designed, support, run):
        return furthest(designed, span, near)
    return t


def _anchors(designed: Designed, support: int, run: BarRun) -> bool:
    """Tell whether top bars of another support are developed in an end support."""
    if development_length(designed, run) <= available(designed, support):
        return True
    return fits_hook(designed, support, run.size, outside=run.outside)


def others_through(designed: Designed, rows: Mapping[int, Sequence[BarRun]]) -> list[BarRun]:
    """Return the top bars besides the corner bars; like ones of two supports that meet are one.

    Common practice: in a short span, bars of both supports that would pass each other, or end
    within a lap of each other, run through. ``rows`` holds the bars of every support, the corner
    bars first.
    """

    def meet(first: BarRun, second: BarRun) -> bool:
        return second.start - first.end < lap_length(designed, first)

    return run_through(
        (rows[support][1:] for support in sorted(rows)), meet,
        lambda first, second: serving(first.serves, second.serves),
    )  # fmt: skip
