"""Top bars that end in a span though they are none of its cuts, and the tension zone (12.10.5).

Bars that meet those of the next support past midspan, and the longest ones, have no point of no
further need: the bars of both supports carry the span together, as the coverage shows. Where some
load case pulls the top at their end, 12.10.5 asks of it what it asks of any other.
"""

from __future__ import annotations

from dataclasses import dataclass, replace

from lineproof.beams.continuous.cutoff import (
    Frame,
    Zone,
    along,
    distance,
    far_face,
    half_of,
    no_further_need,
    support_of,
    zone_at,
)
from lineproof.beams.continuous.cutoff_ends import (
    Ending,
    Runs,
    SideOf,
    at_section,
    tip,
    whole,
)
from lineproof.beams.continuous.cutoff_record import Site, record_zone
from lineproof.beams.continuous.cutoff_sets import text_of
from lineproof.beams.continuous.detailing_data import Designed
from lineproof.beams.continuous.forces import End, other
from lineproof.beams.continuous.laps_handed_over import lapped_ends
from lineproof.beams.continuous.layout import BarRun


def assumed_restraint(frame: Frame, side: SideOf) -> bool:
    """Tell whether the top of a face is in tension by an assumed restraint alone."""
    if support_of(side.span, side.near) not in frame.designed.restrained:
        return False
    point = no_further_need(frame, "top", side.span, side.near, 0.0)
    return point is not None and point.t <= half_of(frame.designed, side.span, side.near)


def _asked_elsewhere(frame: Frame, side: SideOf) -> Runs:
    """Return the top bars of a side whose ends within the span are none of its cuts.

    Where the restraint is assumed none of its bars is a cut: there is no point of no further need.
    """
    return side.runs if assumed_restraint(frame, side) else side.kept


@dataclass(frozen=True, slots=True)
class Laid:
    """All bars as laid, and those of their ends that are lapped with others."""

    runs: Runs
    lapped: frozenset[tuple[BarRun, End]]

    @classmethod
    def of(cls, designed: Designed, runs: Runs) -> Laid:
        """Return bars with what their laps are."""
        return cls(runs, lapped_ends(designed, runs))


@dataclass(frozen=True, slots=True)
class JudgedEnd:
    """Bars that end within a span, those that stand there besides, the rule that lets them."""

    ending: Ending
    continuing: Runs
    zone: Zone


def judged_cuts(designed: Designed, side: SideOf) -> list[JudgedEnd]:
    """Return by which rule of 12.10.5 the cuts of a side may end."""
    cuts = [(ending, side.continuing(index)) for index, ending in enumerate(side.cuts)]
    return [_judged(designed, side, ending, continuing) for ending, continuing in cuts]


def judged_elsewhere(frame: Frame, laid: Laid, side: SideOf) -> list[JudgedEnd]:
    """Return where other bars of a side end within the span, lapped with none, by which rule."""
    designed = frame.designed
    return [
        _judged(designed, side, ending, at_section(laid.runs, "top", x))
        for ending in _ends_elsewhere(designed, laid, side, _asked_elsewhere(frame, side))
        for x in (along(designed, side.span, side.near, ending.t),)
    ]


def _judged(designed: Designed, side: SideOf, ending: Ending, continuing: Runs) -> JudgedEnd:
    zone = zone_at(
        designed, side.face, side.span, side.near, ending.t, continuing, ending.runs
    )  # fmt: skip
    return JudgedEnd(ending, continuing, zone)


def _ends_elsewhere(designed: Designed, laid: Laid, side: SideOf, asked: Runs) -> list[Ending]:
    towards = other(side.near)
    half, far = (find(designed, side.span, side.near) for find in (half_of, far_face))
    tips = [
        (distance(designed, side.span, side.near, tip(last, towards)), run)
        for run in asked
        for last in (whole(designed, laid.runs, run, towards),)
        if (last, towards) not in laid.lapped
    ]
    ends = sorted({t for t, _ in tips if half < t < far})
    return [Ending(t, tuple(run for s, run in tips if s == t)) for t in ends]


def end_key(side: str, number: int) -> str:
    """Return the key of the part of an end that is no cut, by that of its side and its number."""
    return f"{side}-end-{number}"


def record_ends_elsewhere(site: Site, laid: Laid) -> None:
    """Record the shear at every such end that lies in the tension zone, a part each."""
    for number, end in enumerate(judged_elsewhere(site.frame, laid, site.side), start=1):
        if end.zone != "compression":
            own = replace(site, title=f"{site.title}, {text_of(end.ending.runs)}")
            record_zone(own, end_key(site.key, number), end.zone, end.ending, end.continuing)
