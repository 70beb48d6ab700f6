"""Bars that stand at a place but count in part: told are these bars, better developed there."""

from __future__ import annotations

import math
from collections.abc import Mapping
from dataclasses import dataclass, replace

from lineproof.beams.continuous import cures as find
from lineproof.beams.continuous.cures import Variable
from lineproof.record import Entry
from lineproof.record.entry import GIVEN, LINE
from lineproof.standards.a23_3 import development
from lineproof.standards.a23_3.bars import BARS

_SAME = 1e-9


@dataclass(frozen=True, slots=True)
class CountedInPart:
    """An area of bars of which a part counts: ``whole`` is that of all their sections [mm2]."""

    counted: float
    whole: float

    @property
    def percent(self) -> int:
        """How far the bars are developed, down to whole per cent."""
        return math.floor(100 * self.counted / self.whole * (1 + _SAME))

    def area(self, percent: float) -> float:
        """Return the area that counts of bars developed so far."""
        return self.whole * percent / 100

    def variable(self, size: str) -> Variable:
        """Return the part developed, in steps of 1 %; ``size`` is that of all bars, or ``""``."""
        bars = "bars"
        if size:
            bars = f"{round(self.whole / BARS.number(size, 'A_b'))}-{size}"
        bars = f"the {bars} that stand here"
        words = f"{bars}, now developed to {self.percent} %, developed to {{}} %"
        none = f"no greater development of {bars}"
        return Variable(find.up(self.percent, 100, 1), words, "or more", none)


def developed(area: Entry) -> CountedInPart | None:
    """Return how far the bars of an area count; None where all count in full, or none do."""
    whole = _whole(area)
    if not 0 < area.value < whole * (1 - _SAME):
        return None
    return CountedInPart(float(area.value), whole)


def here(steel: Variable) -> Variable:
    """Return an area of bars that counts only as far as developed: no number of bars is told."""
    return replace(steel, words="{} mm² of bars developed here", bar="")


def _whole(area: Entry) -> float:
    """Return an area worked out with all its bars fully developed."""
    if area.kind != LINE:
        return float(area.value)
    args: Mapping[str, Entry] = dict(zip(area.source.names, area.args, strict=True))
    if area.source.text == development.DEVELOPED_AREA.text:
        return _whole(args["A_s"])
    values = [1.0 if _is_part(arg) else _whole(arg) for arg in args.values()]
    return float(area.source.function(*values))


def _is_part(entry: Entry) -> bool:
    """Tell whether a factor of an area is the part developed: numbers of bars are whole."""
    return entry.kind == GIVEN and not entry.unit and 0 < entry.value < 1
