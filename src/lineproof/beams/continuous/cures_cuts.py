"""What would let bars end in a tension zone (12.10.5): a longer bar, closer stirrups.

Each is tried by the rules themselves: at another end of the bars, or with the shear resistance of
closer stirrups along the span.
"""

from __future__ import annotations

import math
from collections.abc import Iterator, Mapping
from dataclasses import dataclass, replace
from itertools import product

from lineproof.beams.continuous import cures as find
from lineproof.beams.continuous import cures_checks
from lineproof.beams.continuous.cures import Cure
from lineproof.beams.continuous.cutoff import (
    STEP,
    Frame,
    along,
    far_face,
    half_of,
    local,
    shear_in_tension,
    zone_at,
)
from lineproof.beams.continuous.cutoff_elsewhere import (
    Laid,
    end_key,
    judged_elsewhere,
)
from lineproof.beams.continuous.cutoff_ends import Ending, Runs, SideOf, bottom_side, top_side
from lineproof.beams.continuous.cutoff_record import cut_key, shear_key, side_key
from lineproof.beams.continuous.cutoff_sets import text_of
from lineproof.beams.continuous.design import Design
from lineproof.beams.continuous.forces import ENDS
from lineproof.beams.continuous.resistance_demand import stretch_at
from lineproof.beams.continuous.shear_check import SpanCheck
from lineproof.beams.continuous.shear_stretches import stretches_of
from lineproof.record import Entry
from lineproof.standards.a23_3 import cutoff as clause


@dataclass(frozen=True, slots=True)
class Cut:
    """Bars of one side of a section that end in a tension zone, and those that go on there."""

    side: SideOf
    ending: Ending
    continuing: Runs

    @property
    def t(self) -> float:
        """Distance of their end from the near axis [mm]."""
        return self.ending.t


def cut_of(design: Design, check: Entry) -> Cut | None:
    """Return the cut that a check of low shear stands for."""
    if check.source is not clause.CUT_AT_LOW_SHEAR:
        return None
    frame, laid = Frame.of(design.designed), Laid.of(design.designed, design.runs)
    found = (
        cut
        for key, side in _sides(design)
        for of_cut, cut in _ends(frame, laid, key, side)
        if shear_key(of_cut) == check.part.key
    )
    return next(found, None)


def _ends(frame: Frame, laid: Laid, key: str, side: SideOf) -> Iterator[tuple[str, Cut]]:
    """Give the ends of the bars of a side within its span, with the key of their parts."""
    for index, ending in enumerate(side.cuts):
        yield cut_key(key, index), Cut(side, ending, side.continuing(index))
    if side.face == "top":
        for number, end in enumerate(judged_elsewhere(frame, laid, side), start=1):
            yield end_key(key, number), Cut(side, end.ending, end.continuing)


def _sides(design: Design) -> Iterator[tuple[str, SideOf]]:
    """Give the bars of every section towards every end, with the key of their part."""
    designed, runs = design.designed, design.runs
    for number, end in product(range(1, len(designed.outline.supports) + 1), ENDS):
        if number <= len(designed.outline.lengths) and not designed.cantilever(number):
            yield side_key("bottom", number, end), bottom_side(designed, runs, number, end)
        if designed.forces.has_span(number, end):
            yield side_key("top", number, end), top_side(designed, runs, number, end)


def cut_cures(design: Design, cut: Cut) -> list[Cure]:
    """Return the cures of bars that end where the shear is not low enough."""
    return [_longer(design, cut), _closer(design, cut)]


def _longer(design: Design, cut: Cut) -> Cure:
    """Return the least length more with which the bars end where they may."""
    side, designed = cut.side, design.designed
    inward = side.face == "bottom"
    half, far = (f(designed, side.span, side.near) for f in (half_of, far_face))
    going, ending = cut.continuing, cut.ending.runs

    def use(changes: Mapping[str, float]) -> float:
        t = cut.t - changes["longer"] if inward else cut.t + changes["longer"]
        if inward and t <= half:
            return 0.0  # no longer cut: they run into the support
        zone = zone_at(designed, side.face, side.span, side.near, t, going, ending)
        return 0.0 if zone else math.inf

    room = (cut.t - half if inward else far - cut.t) + STEP
    bars = f"the {text_of(ending)} that end here"
    (cure,) = find.cures(use, {"longer": find.longer(room, bars)})
    return cure


def _closer(design: Design, cut: Cut) -> Cure:
    """Return the widest stirrups along the span with which the shear at the cut is low."""
    side, designed = cut.side, design.designed
    x = local(designed, side.span, side.near, cut.t)
    M, V = designed.forces.pairs(side.span, x)
    V_f = float(shear_in_tension(M if side.face == "bottom" else -M, V).max())
    check = design.stirrups.checks[side.span - 1]
    place = along(designed, side.span, side.near, cut.t)

    def use(changes: Mapping[str, float]) -> float:
        s = changes["s"]
        bands = tuple(replace(b, spacing=min(b.spacing, s)) for b in check.bands)
        choice = replace(design.stirrups, checks=(SpanCheck(check.state, bands),))
        other = replace(designed, shear=stretches_of(choice, designed.outline))
        values = {"V_f": V_f, "V_r": stretch_at(other, place).V_r}
        return cures_checks.used(clause.CUT_AT_LOW_SHEAR, values)

    spacings = [b.spacing for b in check.bands if math.isfinite(b.spacing)]
    widest = max(spacings, default=find.WIDEST_STIRRUPS)
    spaced = find.spacing(widest)
    variable = replace(spaced, words=f"stirrups at {{}} mm along span {side.span}")
    (cure,) = find.cures(use, {"s": variable})
    return cure
