"""Choosing bars: candidates in the stated order, each tried on the very calculation to be printed.

The order is few sizes, one layer before two (it is easier to build), then least mass, then thin
bars (cracks). Sizes that a yard stocks for beams are tried: 15M to 35M (common practice).
"""

from __future__ import annotations

from collections import Counter
from collections.abc import Callable, Iterable, Iterator
from typing import TypeVar

from lineproof.beams.bars import BarLayer, BarLayers, in_line
from lineproof.errors import UserError
from lineproof.record import Part
from lineproof.record.entry import CHECK
from lineproof.sheet import Sheet, Trial
from lineproof.standards.a23_3.bars import BARS

Candidate = TypeVar("Candidate")

SIZES = ("15M", "20M", "25M", "30M", "35M")
MOST_BARS = 12


def bottom_candidates() -> list[BarLayers]:
    """Return all layouts of one or two sizes, best first."""
    found: list[BarLayers] = []
    for size in SIZES:
        found += [(BarLayer(n, size),) for n in range(2, MOST_BARS + 1)]
        found += [
            (BarLayer(n, size), BarLayer(m, upper))
            for n in range(2, MOST_BARS + 1)
            for upper in SIZES
            for m in range(2, n + 1)
            if in_line(n, m) and BARS.number(upper, "d_b") <= BARS.number(size, "d_b")
        ]
    return sorted(found, key=_order)


def _order(layers: BarLayers) -> tuple[int, int, float, int]:
    sizes = {layer.size for layer in layers}
    area = sum(layer.area for layer in layers)
    return len(sizes), len(layers), area, -sum(layer.number for layer in layers)


def top_candidates(spread_area: float, sides: int) -> Iterator[tuple[BarLayer, int]]:
    """Give top bars in the web and bars per overhang for a least area there [mm2], best first.

    ``sides`` is the number of overhangs.
    """
    found = [
        (BarLayer(n, size), bars_for(spread_area, size))
        for size in SIZES[:3]
        for n in range(2, MOST_BARS + 1)
    ]
    yield from sorted(
        found, key=lambda c: (c[0].area + sides * c[1] * BARS.number(c[0].size, "A_b"), c[0].number)
    )


def bars_for(area: float, size: str) -> int:
    """Return how many bars of a size give an area [mm2]."""
    one = BARS.number(size, "A_b")
    return int(-(-area // one)) if area > 0 else 0


def first_that_holds(
    sheet: Sheet,
    candidates: Iterable[Candidate],
    calculate: Callable[[Sheet, Candidate], None],
    what: str,
) -> Candidate:
    """Return the first candidate for which every check of its calculation holds.

    Raises :class:`UserError` if there is none, with the checks that stopped most of them.
    """
    reasons: Counter[str] = Counter()
    known = {id(part) for part in sheet.parts}
    for candidate in candidates:
        trial = Trial(sheet)
        try:
            calculate(trial, candidate)
        except UserError as error:
            reasons[error.faults[0]] += 1
            continue
        failed = failed_check([part for part in trial.parts if id(part) not in known])
        if failed is None:
            return candidate
        reasons[failed] += 1
    stopped = "; ".join(f"{why} ({count} layouts)" for why, count in reasons.most_common(3))
    raise UserError(
        f"{what}: no bars pass every check; stopped by: {stopped or 'the moment'}; "
        "change the inputs that these rest on, such as h, b_w, h_f or cover"
    )


def failed_check(parts: list[Part]) -> str | None:
    """Return the title of the first check that does not hold."""
    for part in parts:
        for entry in part.entries.values():
            if entry.kind == CHECK and not entry:
                return str(entry.source.title)
    return None
