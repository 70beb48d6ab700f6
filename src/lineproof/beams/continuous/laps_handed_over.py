"""Laps of bars that are not in line: a row that ends beside another that begins, in tension.

Where the bars that go on do not carry what acts, the ones that end must hand their force to those
that begin: that is a lap (12.15), whatever their numbers and sizes. Where the others do somewhere
along the overlap, the bars are cut there (12.10) and hand over nothing.
"""

from __future__ import annotations

from bisect import bisect_left, bisect_right
from collections.abc import Iterable, Mapping, Sequence

import numpy as np

from lineproof.beams.continuous.anchorage import bar_of
from lineproof.beams.continuous.anchorage_record import Lengths, Writers, plain
from lineproof.beams.continuous.cutoff_sets import text_of
from lineproof.beams.continuous.detailing_data import Designed
from lineproof.beams.continuous.forces import End
from lineproof.beams.continuous.layout import BarRun
from lineproof.beams.continuous.resistance import (
    MOST_LAP,
    Standing,
    depth_of,
    level_pairs,
    provide,
    span_at,
    stand,
    yield_force,
)
from lineproof.beams.continuous.resistance_cover import ratios
from lineproof.beams.continuous.resistance_demand import demand_at
from lineproof.beams.steps import Steps
from lineproof.formula import COMMON_PRACTICE
from lineproof.record import Entry
from lineproof.standards.a23_3 import bars as bar_clause
from lineproof.standards.a23_3 import laps

Pair = tuple[BarRun, BarRun]

_PLACES = 11
"""Stations along an overlap at which the bars that go on are looked at."""
_HANDED = (
    "All along the overlap the bars that go on do not carry what acts there: those that end hand "
    "their force over to those that begin. That is a lap, of all bars at one place: class B."
)


def handed_over(designed: Designed, runs: Iterable[BarRun]) -> list[Pair]:
    """Return the bars that end and those that begin beside them and take over their force."""
    kept = [run for run in runs if run.place != "side face"]
    pairs = level_pairs(designed.outline, kept)
    ended, begun = {i for i, _ in pairs}, {j for _, j in pairs}
    order = sorted((j for j in range(len(kept)) if j not in begun), key=lambda j: kept[j].start)
    starts = [kept[j].start for j in order]
    beside = [
        (i, j)
        for i, first in enumerate(kept)
        if i not in ended
        # Of those that start inside it.
        for j in sorted(order[bisect_right(starts, first.start) : bisect_left(starts, first.end)])
        if _overlap(designed, first, kept[j])
    ]
    if not beside:
        return []
    standing = stand(designed, kept)
    made = []
    for i, j in beside:
        start, end = kept[j].start, kept[i].end
        going = [
            bars
            for n, bars in enumerate(standing)
            if (n in ended or not start <= bars.run.end <= end)
            and (n in begun or not start <= bars.run.start <= end)
        ]
        if _needed(designed, going, kept[i], (start, end)):
            made.append((kept[i], kept[j]))
    return made


def lapped_ends(designed: Designed, runs: Iterable[BarRun]) -> frozenset[tuple[BarRun, End]]:
    """Return the ends of bars that are lapped with others, in line or beside them."""
    kept = [run for run in runs if run.place != "side face"]
    pairs = [(kept[i], kept[j]) for i, j in level_pairs(designed.outline, kept)]
    pairs += handed_over(designed, kept)
    ended: set[tuple[BarRun, End]] = {(first, "right") for first, _ in pairs}
    begun: set[tuple[BarRun, End]] = {(second, "left") for _, second in pairs}
    return frozenset(ended | begun)


def _overlap(designed: Designed, first: BarRun, second: BarRun) -> bool:
    """Tell whether one row ends beside the other one that begins, at one height."""
    same = (first.face, first.layer, first.place) == (second.face, second.layer, second.place)
    if not (same and first.start < second.start < first.end < second.end):
        return False
    if first.end - second.start > MOST_LAP * max(first.diameter, second.diameter):
        return False
    outline = designed.outline
    return first.face == "top" or depth_of(outline, first) == depth_of(outline, second)


def _needed(
    designed: Designed, going: Sequence[Standing], first: BarRun, ends: tuple[float, float]
) -> bool:
    """Tell whether the bars that go on do not carry what acts, all along an overlap."""
    outline = designed.outline
    for place in np.linspace(*ends, _PLACES).tolist():
        span = span_at(outline, place)
        local = min(max(place - outline.axes[span - 1], 0.0), outline.lengths[span - 1])
        demand = demand_at(designed, span, np.array([local]))
        provided = provide(designed, going, first.face, demand.x, [span])
        if ratios(demand.side(first.face), provided, yield_force(designed))[0] <= 1:
            return False
    return True


def record_handed_over(writers: Writers, lengths: Lengths, runs: Iterable[BarRun]) -> None:
    """Record every such lap in a part: size of the bars, its length against what is laid."""
    designed, sheet = writers.designed, writers.sheet
    for number, pair in enumerate(handed_over(designed, runs), start=1):
        first, second = pair
        weak, strong = sorted(pair, key=lambda run: run.area)
        span = span_at(designed.outline, (first.end + second.start) / 2)
        title = f"Lap of {first.face} bars {text_of((first,))} with {text_of((second,))}"
        with sheet.part(f"anchorage-handed-over-{number}", f"{title}, span {span}"):
            sheet.note(
                "class", _HANDED, title="Bars that take over", clause="12.15.1",
                basis=COMMON_PRACTICE,
            )  # fmt: skip
            steps = Steps(sheet, lengths[bar_of(designed, weak)])
            thick = lengths[bar_of(designed, max(pair, key=lambda run: run.diameter))]
            steps.check(laps.LAPPABLE, d_b=thick["d_b"])
            if weak.size != strong.size:
                _record_two_rows(steps, weak, strong, lengths[bar_of(designed, strong)])
            overlap = plain(first.end - second.start, "mm")
            steps.bind(l_lp=sheet.given("l_lp", overlap, source="as laid"))
            steps.check(laps.LONG_ENOUGH)


def _record_two_rows(
    steps: Steps, weak: BarRun, strong: BarRun, stronger: Mapping[str, Entry]
) -> None:
    """Record the length of a lap of rows that differ: the stronger bars are developed in part."""
    for place, run, A_b in ((1, weak, steps.entry("A_b")), (2, strong, stronger["A_b"])):
        number = steps.sheet.given(
            f"n_{place}", str(run.number), "number of bars as laid", source="as laid"
        )
        made = steps.line(bar_clause.AREA_OF_BARS, f"A_s{place}", n_b=number, A_b=A_b)
        steps.bind(**{f"A_s{place}": made})
    steps.line(laps.TWO_ROWS, l_sw=steps.entry("l_s"), l_dt=stronger["l_d"])
