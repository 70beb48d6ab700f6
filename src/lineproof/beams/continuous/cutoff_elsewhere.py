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
from lineproof.beams.continuous.laps_handed_over import handed_over
from lineproof.beams.continuous.layout import BarRun
from lineproof.beams.continuous.resistance import level_pairs


def assumed_restraint(frame: Frame, side: SideOf) -> bool:
    """Tell whether the top of a face is in tension by an assumed restraint alone."""
    if support_of(side.span, side.near) not in frame.designed.restrained:
        return False
    point = no_further_need(frame, "top", side.span, side.near, 0.0)
    return point is not None and point.t <= half_of(frame.designed, side.span, side.near)


def asked_elsewhere(frame: Frame, side: SideOf) -> Runs:
    """Return the top bars of a side whose ends within the span are none of its cuts.

    Where the restraint is assumed none of its bars is a cut: there is no point of no further need.
    """
    return side.runs if assumed_restraint(frame, side) else side.kept


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


def judged_elsewhere(designed: Designed, runs: Runs, side: SideOf, asked: Runs) -> list[JudgedEnd]:
    """Return by which rule the bars may end that :func:`ends_elsewhere` finds."""
    return [
        _judged(designed, side, ending, at_section(runs, "top", x))
        for ending in ends_elsewhere(designed, runs, side, asked)
        for x in (along(designed, side.span, side.near, ending.t),)
    ]


def _judged(designed: Designed, side: SideOf, ending: Ending, continuing: Runs) -> JudgedEnd:
    zone = zone_at(
        designed, side.face, side.span, side.near, ending.t, continuing, ending.runs
    )  # fmt: skip
    return JudgedEnd(ending, continuing, zone)


def ends_elsewhere(designed: Designed, runs: Runs, side: SideOf, asked: Runs) -> list[Ending]:
    """Return where some of the bars of a side end within the span and are lapped with none."""
    towards = other(side.near)
    half, far = (find(designed, side.span, side.near) for find in (half_of, far_face))
    tips = [
        (distance(designed, side.span, side.near, tip(last, towards)), run)
        for run in asked
        for last in (whole(designed, runs, run, towards),)
        if not _handed(designed, runs, last, towards)
    ]
    ends = sorted({t for t, _ in tips if half < t < far})
    return [Ending(t, tuple(run for s, run in tips if s == t)) for t in ends]


def _handed(designed: Designed, runs: Runs, run: BarRun, towards: End) -> bool:
    """Tell whether a run is lapped with another at its end towards one side."""
    kept = [each for each in runs if each.place != "side face"]
    pairs = [(kept[i], kept[j]) for i, j in level_pairs(designed.outline, kept)]
    place = 0 if towards == "right" else 1
    return any(pair[place] is run for pair in (*pairs, *handed_over(designed, runs)))


def end_key(side: str, number: int) -> str:
    """Return the key of the part of an end that is no cut, by that of its side and its number."""
    return f"{side}-end-{number}"


def record_ends_elsewhere(site: Site, runs: Runs) -> None:
    """Record the shear at every such end that lies in the tension zone, a part each."""
    asked = asked_elsewhere(site.frame, site.side)
    judged = judged_elsewhere(site.writers.designed, runs, site.side, asked)
    for number, end in enumerate(judged, start=1):
        if end.zone != "compression":
            own = replace(site, title=f"{site.title}, {text_of(end.ending.runs)}")
            record_zone(own, end_key(site.key, number), end.zone, end.ending, end.continuing)
