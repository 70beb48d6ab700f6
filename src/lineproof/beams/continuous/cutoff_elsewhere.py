"""Top bars that end in a span though they are none of its cuts, and the tension zone (12.10.5).

Bars that meet those of the next support past midspan, and the longest ones, have no point of no
further need: the bars of both supports carry the span together, as the coverage shows. Where some
load case pulls the top at their end, 12.10.5 asks of it what it asks of any other.
"""

from __future__ import annotations

from dataclasses import replace

from lineproof.beams.continuous.cutoff import along, distance, far_face, half_of, zone_at
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


def record_ends_elsewhere(site: Site, runs: Runs, asked: Runs) -> None:
    """Record the shear at every such end that lies in the tension zone, a part each."""
    side, designed = site.side, site.writers.designed
    for number, ending in enumerate(ends_elsewhere(designed, runs, side, asked), start=1):
        x = along(designed, side.span, side.near, ending.t)
        continuing = at_section(runs, "top", x)
        zone = zone_at(designed, "top", side.span, side.near, ending.t, continuing, ending.runs)
        if zone != "compression":
            own = replace(site, title=f"{site.title}, {text_of(ending.runs)}")
            record_zone(own, f"{site.key}-end-{number}", zone, ending, continuing)
