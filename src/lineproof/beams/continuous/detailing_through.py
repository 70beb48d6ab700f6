"""Bars of neighbouring spans or supports that meet: like ones are one bar that runs through."""

from __future__ import annotations

from collections.abc import Callable, Iterable, Sequence
from dataclasses import replace

import numpy as np

from lineproof.beams.continuous.cutoff import (
    MARGIN,
    full_area,
    full_moment,
    half_of,
    local,
    support_of,
)
from lineproof.beams.continuous.detailing_data import Designed
from lineproof.beams.continuous.forces import End
from lineproof.beams.continuous.layout import BarRun
from lineproof.beams.continuous.resistance import yield_force
from lineproof.beams.continuous.resistance_demand import demand_at


def run_through(
    rows: Iterable[Sequence[BarRun]],
    meet: Callable[[BarRun, BarRun], bool],
    serving: Callable[[BarRun, BarRun], str],
) -> list[BarRun]:
    """Return the bars of all rows, like ones of neighbouring rows in one where they ``meet``.

    ``rows`` hold the bars of spans or supports from left to right. Where one has more bars than
    its neighbour, the rest keep their own ends. ``serving`` says what bars of two rows are for.
    """
    made: list[BarRun] = []
    before: list[BarRun] = []
    for row in rows:
        now: list[BarRun] = []
        for run in row:
            rest = run
            for place, earlier in enumerate(before):
                number = min(earlier.number, rest.number)
                if number and _like(earlier, rest) and meet(earlier, rest):
                    now.append(_one(earlier, rest, number, serving(earlier, rest)))
                    before[place] = replace(earlier, number=earlier.number - number)
                    rest = replace(rest, number=rest.number - number)
            now.append(rest)
        made += before
        before = now
    return [run for run in (*made, *before) if run.number]


def _like(first: BarRun, second: BarRun) -> bool:
    return (first.size, first.layer, first.place) == (second.size, second.layer, second.place)


def _one(first: BarRun, second: BarRun, number: int, serves: str) -> BarRun:
    """Return bars that go from the outer end of the first to that of the second."""
    left, right = min(first, second, key=lambda r: r.start), max(first, second, key=lambda r: r.end)
    return replace(
        first, number=number, start=left.start, hook_start=left.hook_start, end=right.end,
        hook_end=right.hook_end, serves=serves,
    )  # fmt: skip


def going_past(designed: Designed, span: int, near: End, groups: Sequence[BarRun]) -> int:
    """Return how many groups beside the corners go past an interior support, to be developed there.

    As few as carry the bottom tension from its face to its axis: where lateral loads turn the
    moment at a support, bars that end in it do not. None where the soffit steps.
    """
    support = support_of(span, near)
    depths = designed.outline.depths
    beside = span - 1 if near == "left" else span + 1
    if not designed.held(support) or designed.exterior(support):
        return 0
    if depths[span - 1] != depths[beside - 1]:
        return 0
    places = local(designed, span, near, np.array([0.0, half_of(designed, span, near)]))
    side = demand_at(designed, span, places).bottom
    M, F = float(side.M.max()) / MARGIN, float(side.F.max()) / MARGIN
    for number in range(len(groups)):
        going = groups[: number + 1]
        F_r = full_area(designed, going)[0] * yield_force(designed)
        if F_r >= F and full_moment(designed, "bottom", span, going) >= M:
            return number
    return len(groups) - 1
