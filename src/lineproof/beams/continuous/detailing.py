"""The bars of a beam laid out: one call, plain numbers, buildable by the rules of the parts."""

from __future__ import annotations

from lineproof.beams.continuous.cutoff import Frame
from lineproof.beams.continuous.detailing_bottom import lay_bottom
from lineproof.beams.continuous.detailing_data import Designed
from lineproof.beams.continuous.detailing_top import lay_top
from lineproof.beams.continuous.layout import BarRun


def lay_bars(designed: Designed) -> tuple[BarRun, ...]:
    """Return all longitudinal bars of a beam whose sections are designed, from left to right.

    Raises :class:`UserError` where bars too thick to lap are longer than the stock.
    """
    frame = Frame.of(designed)
    runs = (*lay_bottom(frame), *lay_top(frame))
    return tuple(sorted(runs, key=lambda r: (r.face, r.layer, r.place, r.start)))
