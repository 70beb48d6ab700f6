"""Bars of neighbouring spans or supports that meet: like ones are one bar that runs through."""

from __future__ import annotations

from collections.abc import Callable, Iterable, Sequence
from dataclasses import replace

from lineproof.beams.continuous.layout import BarRun


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
