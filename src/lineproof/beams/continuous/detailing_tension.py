"""Top bars that end in a tension zone where 12.10.5 lets none end: made longer as laid."""

from __future__ import annotations

from collections.abc import Mapping, MutableMapping
from dataclasses import replace

import numpy as np

from lineproof.beams.continuous.cutoff import STEP, Frame, far_face, floor50, thin, zones_at
from lineproof.beams.continuous.cutoff_elsewhere import (
    JudgedEnd,
    Laid,
    assumed_restraint,
    judged_cuts,
    judged_elsewhere,
)
from lineproof.beams.continuous.cutoff_ends import Runs, SideOf, top_side
from lineproof.beams.continuous.detailing_meeting import Reach
from lineproof.beams.continuous.forces import End

SIGN: dict[End, float] = {"left": -1.0, "right": 1.0}
Reaches = Mapping[int, MutableMapping[End, Reach]]
"""How far the top bars of every support reach, by its number and the side of it."""


def lengthen(frame: Frame, runs: Runs, reaches: Reaches) -> bool:
    """Lengthen the reach of bars whose end no rule of 12.10.5 allows; tell whether any is longer.

    ``runs`` are all top bars laid with these reaches. The judgement is that of the record.
    """
    axes = frame.designed.outline.axes
    laid, longer = Laid.of(frame.designed, runs), False
    for support, towards in [(support, side) for support, each in reaches.items() for side in each]:
        side = top_side(frame.designed, runs, support, towards)
        for end in _not_allowed(frame, laid, side):
            added = _next_place(frame, side, end) - end.ending.t
            for other, found in reaches.items():  # bars of the support before may end here
                if towards in found:
                    behind = (axes[support - 1] - axes[other - 1]) * SIGN[towards]
                    made = _longer(found[towards], end.ending.t + behind, added)
                    longer = longer or made != found[towards]
                    found[towards] = made
    return longer


def _not_allowed(frame: Frame, laid: Laid, side: SideOf) -> list[JudgedEnd]:
    cuts = [] if assumed_restraint(frame, side) else judged_cuts(frame.designed, side)
    return [end for end in (*cuts, *judged_elsewhere(frame, laid, side)) if not end.zone]


def _next_place(frame: Frame, side: SideOf, end: JudgedEnd) -> float:
    """Return the next place towards the far support where the bars may end; at most its axis."""
    designed, t = frame.designed, end.ending.t
    far = far_face(designed, side.span, side.near)
    places = np.arange(t + STEP, far, STEP).tolist()
    zones = zones_at(designed, "top", side.span, side.near, places, end.continuing)
    allowed = (
        place
        for place, zone in zip(places, zones, strict=True)
        if zone and (zone != "double area" or thin(end.ending.runs))
    )
    return next(allowed, max(floor50(designed.outline.lengths[side.span - 1]), t))


def _longer(found: Reach, t: float, added: float) -> Reach:
    """Return a reach of which the bars that end at t are longer."""
    short = found.short + added if abs(found.short - t) < 1.0 else found.short
    long = found.long + added if abs(found.long - t) < 1.0 else found.long
    return replace(found, long=max(long, short), short=short)
