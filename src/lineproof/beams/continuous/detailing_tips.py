"""Top bars at the free end of a cantilever, where straight ones carry too little.

A point load near the tip asks for bars within their development length: they are hooked there
(common practice), and where that is not enough, more of them are asked for.
"""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import replace

from lineproof.beams.continuous.anchorage import has_hooks, hook_leg_fits
from lineproof.beams.continuous.cutoff import DESIGN_STATIONS, MARGIN, Frame, worst_between
from lineproof.beams.continuous.detailing_data import Designed
from lineproof.beams.continuous.layout import BarRun
from lineproof.beams.continuous.resistance import Standing, stand

_NEAR = 1e-6


def with_tip_hooks(frame: Frame, runs: Sequence[BarRun]) -> tuple[BarRun, ...]:
    """Return top bars with hooks at the free ends that need them."""
    designed = frame.designed
    made = tuple(runs)
    for support in _tips(designed):
        if not has_hooks(designed):
            continue
        straight = _worst(frame, support, stand(designed, made))
        if straight > MARGIN:
            hooked = tuple(_hooked(designed, support, run) for run in made)
            better = _worst(frame, support, stand(designed, hooked)) < straight
            made = hooked if better else made
    return made


def tip_lacks(designed: Designed, standing: Sequence[Standing]) -> Iterator[tuple[int, float]]:
    """Give the supports beside free ends whose top bars lack near the tip.

    With each the area of all its top bars [mm2] that would do, developed as they are.
    """
    for support in _tips(designed):
        worst = _worst(Frame.of(designed, DESIGN_STATIONS), support, standing)
        held = 2 if support == 1 else support - 1
        top = designed.bars.top[held - 1]
        if worst > 1:
            yield held, worst * sum(layer.area for layer in (*top.web, *top.spread))


def _tips(designed: Designed) -> list[int]:
    """Return the numbers of the free ends."""
    return [n for n in (1, len(designed.outline.supports)) if not designed.held(n)]


def _hooked(designed: Designed, support: int, run: BarRun) -> BarRun:
    """Return a bar that ends at the tip with a hook there, if it is within the web and has room."""
    tip, inward = designed.outline.end_at(support)
    x = run.start if support == 1 else run.end
    ends_there = abs(x - tip - inward * designed.end_cover) <= _NEAR
    within = run.face == "top" and run.place == "web"
    if not (within and ends_there and hook_leg_fits(designed, support, run.size)):
        return run
    return replace(run, hook_start="90") if support == 1 else replace(run, hook_end="90")


def _worst(frame: Frame, support: int, standing: Sequence[Standing]) -> float:
    """Return the worst ratio of the top bars within their development length from the tip."""
    outline = frame.designed.outline
    tip, inward = outline.end_at(support)
    reach = max((max(bars.rise_start, bars.rise_end) for bars in standing), default=0.0)
    span = 1 if support == 1 else len(outline.lengths)
    low, high = sorted((tip, tip + inward * reach))
    return worst_between(frame, standing, "top", span, (low, high))
