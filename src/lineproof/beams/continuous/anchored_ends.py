"""What bars of a size hold at the end supports, by hooks or straight, in full or in part.

A bar counts with the part that the length in its support is of that which it needs: steel in excess
of that required lets a straight bar or a hook be as much shorter (12.2.5, 12.5.3).
"""

from __future__ import annotations

import math

from lineproof.beams.bars import TopBars, spaced
from lineproof.beams.choice import MOST_BARS
from lineproof.beams.continuous.anchorage import (
    Bar,
    available,
    develop,
    development_length,
    hook_at,
    hook_part,
    room_beside,
)
from lineproof.beams.continuous.detailing_data import Designed
from lineproof.beams.continuous.developed import counted_part
from lineproof.beams.continuous.layout import BarRun, Hook
from lineproof.standards.a23_3.bars import BARS


def least_anchored(bare: Designed, span: int, size: str, needed: float) -> float:
    """Return the least area of bottom bars of a span of which ``needed`` is anchored at its ends.

    mm2. Infinite where no number of bars does.
    """
    held = [support for support in (span, span + 1) if bare.exterior(support)]
    return max((_least_at(bare, support, size, needed) for support in held), default=0.0)


def _least_at(bare: Designed, support: int, size: str, needed: float) -> float:
    A_b, hooked = BARS.number(size, "A_b"), _hooked(bare, support, size)
    if hooked >= 1:
        return needed
    for number in range(2, MOST_BARS + 1):
        bar = Bar("bottom", "web", 1, size, spaced(number), _depth(bare, support))
        if number * A_b * max(hooked, _straight(bare, support, bar)) >= needed:
            return number * A_b
    return math.inf


def top_part(bare: Designed, support: int, top: TopBars) -> float:
    """Return the part of the area of top bars of one size that counts at the face of their support.

    1 at a support that the bars run through.
    """
    if not bare.exterior(support):
        return 1.0
    # Bars that run on into a deeper span are developed as there, with more concrete below them.
    size, h, beside = top.web.size, max(bare.outline.depths), top.sides * top.overhang
    area = 0.0
    for number, layer in enumerate(top.layers, start=1):
        web = Bar("top", "web", number, size, spaced(layer.number), h)
        area += layer.area * _counted(bare, support, web)
    if beside:
        room = room_beside(bare, [1 if support == 1 else len(bare.outline.lengths)])
        spread = Bar("top", "overhang", 1, size, beside, h, room)
        in_overhangs = top.area - sum(layer.area for layer in top.layers)
        area += in_overhangs * _counted(bare, support, spread)
    return area / top.area


def _counted(bare: Designed, support: int, bar: Bar) -> float:
    """Return the part of a top bar that counts: straight where it develops so, else by its hook."""
    straight = _straight(bare, support, bar)
    hooked = _hooked(bare, support, bar.size, outside=bar.place == "overhang")
    return straight if straight >= 1 or hooked == 0 else hooked


def _hooked(bare: Designed, support: int, size: str, *, outside: bool = False) -> float:
    """Return the part of its strength that a hook develops, of lengths as they are recorded."""
    part = hook_part(bare, support, size, outside=outside)
    if part in (0.0, 1.0):
        return part
    l_dh = hook_at(bare, support, size, outside=outside).l_dh
    return counted_part(available(bare, support), l_dh)


def end_hook(designed: Designed, support: int, run: BarRun) -> Hook:
    """Return the hook of top bars at an end support: none where they develop straight.

    Nor where one would develop nothing; nor where it is not developed in full and no moment stands:
    the end is free to rotate, no restraint is assumed.
    """
    part = hook_part(designed, support, run.size, outside=run.outside)
    if part == 0 or development_length(designed, run) <= available(designed, support):
        return ""
    simple = designed.outline.supports[support - 1].kind == "simple"
    free = simple and support not in designed.restrained
    return "" if free and part < 1 else "90"


def _straight(bare: Designed, support: int, bar: Bar) -> float:
    """Return the part of its strength that a straight bar develops at the inner face."""
    return counted_part(available(bare, support), develop(bare.basis, bar).l_d)


def _depth(bare: Designed, support: int) -> float:
    """Return the depth of the beam at an end support [mm]."""
    return bare.outline.depths[0 if support == 1 else -1]
