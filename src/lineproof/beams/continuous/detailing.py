"""The bars of a beam laid out: one call, plain numbers, buildable by the rules of the parts."""

from __future__ import annotations

from lineproof.beams.continuous.anchorage import ties_at
from lineproof.beams.continuous.cutoff import DESIGN_STATIONS, Frame
from lineproof.beams.continuous.detailing_bottom import lay_bottom
from lineproof.beams.continuous.detailing_data import Designed
from lineproof.beams.continuous.detailing_top import lay_top
from lineproof.beams.continuous.layout import BarRun, StirrupZone


def lay_bars(designed: Designed, count: int = DESIGN_STATIONS) -> tuple[BarRun, ...]:
    """Return all longitudinal bars of a beam whose sections are designed, from left to right.

    ``count`` is the number of stations a span at which the bars are fitted to their demand.
    Raises :class:`UserError` where bars too thick to lap are longer than the stock.
    """
    frame = Frame.of(designed, count)
    runs = (*lay_bottom(frame), *lay_top(frame))
    return tuple(sorted(runs, key=lambda r: (r.face, r.layer, r.place, r.start)))


def hook_ties(designed: Designed, runs: tuple[BarRun, ...]) -> tuple[StirrupZone, ...]:
    """Return the ties around hooks of small cover in the end supports (12.5.4)."""
    made = []
    last = len(designed.outline.supports)
    for support in (1, last):
        spacing = ties_at(designed, runs, support)
        if not spacing or not designed.held(support):
            continue
        width = designed.outline.supports[support - 1].width - designed.end_cover
        number = max(int(width // spacing), 1)
        axis = designed.outline.axes[support - 1]
        span = 1 if support == 1 else last - 1
        reach = (number - 1) * spacing
        start = axis - designed.outline.supports[support - 1].half + designed.end_cover
        if support == last:
            start = axis + designed.outline.supports[support - 1].half - designed.end_cover - reach
        made.append(
            StirrupZone(
                span, start, start + reach, number, spacing, designed.basis.stirrups.size,
                designed.basis.stirrups.legs, around_hooks=True,
            )
        )  # fmt: skip
    return tuple(made)
