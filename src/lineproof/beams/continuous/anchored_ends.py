"""How many bottom bars of a size an end support holds, by hooks or straight (11.3.9)."""

from __future__ import annotations

import math

from lineproof.beams.bars import spaced
from lineproof.beams.choice import MOST_BARS
from lineproof.beams.continuous.anchorage import Bar, available, develop, fits_hook, has_hooks
from lineproof.beams.continuous.detailing_data import Designed
from lineproof.standards.a23_3.bars import BARS


def least_anchored(bare: Designed, span: int, size: str, needed: float) -> float:
    """Return the least area of bottom bars of a span of which ``needed`` is anchored at its ends.

    mm2. Where no hook of the size fits, straight bars count by the part of their development length
    that the support holds; infinite where no number of bars does.
    """
    held = [support for support in (span, span + 1) if bare.exterior(support)]
    return max((_least_at(bare, support, size, needed) for support in held), default=0.0)


def _least_at(bare: Designed, support: int, size: str, needed: float) -> float:
    if has_hooks(bare) and fits_hook(bare, support, size):
        return needed
    l_av, A_b = available(bare, support), BARS.number(size, "A_b")
    h = bare.outline.depths[0 if support == 1 else -1]
    for number in range(2, MOST_BARS + 1):
        straight = Bar("bottom", "web", 1, size, spaced(number), h)
        part = min(l_av / develop(bare.basis, straight).l_d, 1.0)
        if number * A_b * part >= needed:
            return number * A_b
    return math.inf
