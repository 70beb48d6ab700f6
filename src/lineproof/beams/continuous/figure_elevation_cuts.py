"""Cut-off lengths of an elevation: from the support axes to the ends of bars, and their texts."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import dataclass, replace
from itertools import product
from typing import Literal

from lineproof.beams.continuous.figure_elevation_gaps import Short
from lineproof.beams.continuous.figure_elevation_view import View
from lineproof.beams.continuous.layout import BarRun, Hook
from lineproof.drawing.metrics import PAGE_WIDTH, text_width
from lineproof.drawing.paper import FIT_MARGIN

NUMBER = 2.3
"""Text size of cut-off lengths."""
LEAST_SHOWN = 1.0
"""Shorter distances are not dimensioned, mm of the beam."""
PAST = 0.4
Side = Literal["start", "end"]


@dataclass(frozen=True, slots=True)
class Cut:
    """A cut-off length between a support axis and an end of a bar.

    ``outside`` is the side at which its text stands if it does not fit between. ``lower`` tells
    that it stands under the other one.
    """

    axis: float
    end: float
    hook: Hook
    outside: Side
    lower: bool = False

    @property
    def length(self) -> float:
        """Distance of the end of the bar from the axis [mm]."""
        return abs(self.end - self.axis)

    @property
    def needed(self) -> float:
        """Width that the text needs on paper."""
        return text_width(((f"{self.length:.0f}", "roman"),), NUMBER) + FIT_MARGIN

    def fits(self, view: View) -> bool:
        """Tell whether the text stands between the ends."""
        return self.needed <= self.length * view.scale

    def reach(self, view: View) -> tuple[float, float]:
        """Return what line and text occupy on paper."""
        low, high = sorted((view.paper(self.axis), view.paper(self.end)))
        if self.fits(view):
            return low, high
        more = self.needed + PAST
        return (low - more, high) if self.outside == "start" else (low, high + more)


def cut_lengths(view: View, run: BarRun, short: Sequence[Short] = ()) -> tuple[Cut, ...]:
    """Return the cut-off lengths of a run, from the nearest axes, with places for their texts.

    Where two cannot stand beside each other the shorter stands lower if both are from one axis;
    of others one is enough, since the length of the bar is printed: the one in a stretch that is
    ``short`` of bars, the one without a hook, the shorter.
    """

    def rank(cut: Cut) -> tuple[bool, bool, float]:
        inside = any(each.bounded_by(run, cut.end) for each in short)
        return not inside, bool(cut.hook), cut.length

    cuts = _nearest(view, run, rank)
    best = _placed(view, run, cuts)
    if best is not None:
        return best
    if len(cuts) > 1 and cuts[0].axis == cuts[1].axis:
        apart = _one_under_the_other(view, run, cuts)
        if apart is not None:
            return apart
    for cut in sorted(cuts, key=rank):
        alone = _placed(view, run, (cut,))
        if alone is not None:
            return alone
    return ()


def _nearest(
    view: View, run: BarRun, rank: Callable[[Cut], tuple[bool, bool, float]]
) -> tuple[Cut, ...]:
    """Measure each visible end from its nearest axis; of two on one side one is enough."""
    axes = view.outline.axes
    cuts = tuple(
        cut
        for at, hook in ((run.start, run.hook_start), (run.end, run.hook_end))
        if view.low <= at <= view.high
        for cut in [Cut(min(axes, key=lambda axis: abs(axis - at)), at, hook, "end")]
        if cut.length >= LEAST_SHOWN
    )
    if len(cuts) > 1 and cuts[0].axis == cuts[1].axis:
        same_side = (cuts[0].end < cuts[0].axis) == (cuts[1].end < cuts[1].axis)
        if same_side:
            return (min(cuts, key=lambda cut: (rank(cut)[0], cut.length)),)
    return cuts


def _one_under_the_other(view: View, run: BarRun, cuts: tuple[Cut, ...]) -> tuple[Cut, ...] | None:
    """Place two lengths at different heights, the shorter lower; none if one finds no place."""
    long, short = sorted(cuts, key=lambda cut: -cut.length)
    upper, lower = _placed(view, run, (long,)), _placed(view, run, (replace(short, lower=True),))
    return None if upper is None or lower is None else (*upper, *lower)


def _placed(view: View, run: BarRun, cuts: tuple[Cut, ...]) -> tuple[Cut, ...] | None:
    """Choose sides for the texts so that nothing touches; none if there is no such choice."""
    for sides in product(*(_sides(view, run, cut, cuts) for cut in cuts)):
        chosen = tuple(replace(cut, outside=side) for cut, side in zip(cuts, sides, strict=True))
        reaches = sorted(cut.reach(view) for cut in chosen)
        apart = len(reaches) <= 1 or reaches[0][1] <= reaches[1][0] + 1e-6
        if apart and all(low >= 1.0 and high <= PAGE_WIDTH - 1.0 for low, high in reaches):
            return chosen
    return None


def _sides(view: View, run: BarRun, cut: Cut, cuts: tuple[Cut, ...]) -> tuple[Side, ...]:
    """Sides in the order of preference: under the bar, unless both ends share one axis."""
    if cut.fits(view):
        return ("end",)
    shared = len(cuts) > 1 and cuts[0].axis == cuts[1].axis
    at_start = cut.end == run.start
    return ("start", "end") if at_start == shared else ("end", "start")
