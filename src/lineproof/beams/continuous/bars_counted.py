"""Bars that count at a section as recorded lines: numbers and sizes, then their area."""

from __future__ import annotations

from collections import Counter
from typing import Any

from lineproof.beams.continuous.shear_stretches import BarsOver
from lineproof.beams.continuous.symbols import stated
from lineproof.beams.steps import Steps
from lineproof.record import Entry
from lineproof.standards.a23_3.bars import BARS

_TITLES = {
    "A_s": "Bars in tension here, as far as developed",
    "A_sp": "Bars on the other face here, as far as developed",
}


def record_area(steps: Steps, symbol: str, over: BarsOver) -> Entry:
    """Record inside the open part the area of bars that count, and bind it as ``symbol``."""
    sheet, where = steps.sheet, _where(over)
    counts: Counter[tuple[str, float, float, float]] = Counter()
    for share in over.shares:
        counts[share.run.size, share.part, share.length, share.rise] += share.run.number
    if not counts:
        made = sheet.given(symbol, "0 mm2", source="no bar is developed here")
        steps.bind(**{symbol: made})
        return made
    letter = "t" if symbol == "A_s" else "c"
    side = {"t": "tension", "c": "compression"}[letter]
    bound: dict[str, Any] = {}
    terms = []
    for place, ((size, part, length, rise), number) in enumerate(sorted(counts.items()), start=1):
        area, count = f"A_{letter}{size}", f"n_{letter}{place}"
        if area not in bound:
            bound[area] = sheet.lookup(
                area, BARS, size, "A_b", title=f"area of one bar {size}, {side} side"
            )
        bound[count] = sheet.given(
            count,
            str(number),
            f"number of bars {size}, {side} side, group {place}",
            source="bars as laid",
        )
        term = f"{count}*{area}"
        if part < 1:
            name = f"r_{letter}{place}"
            bound[name] = sheet.given(
                name, f"{part:.12g}", f"part developed of bars {size}, {side} side, group {place}",
                source=f"{where} {length:.0f} mm to the end of the bars, of {rise:.0f} mm needed",
            )  # fmt: skip
            term = f"{term}*{name}"
        terms.append(term)
    text = f"{symbol} = {' + '.join(terms)}"
    made = sheet.line(stated(text, system="N-mm"), title=_TITLES[symbol], **bound)
    steps.bind(**{symbol: made})
    return made


def _where(over: BarsOver) -> str:
    """Say where the bars of a stretch are the least developed."""
    start, end = (f"{x / 1000:.2f}" for x in over.looked_at)
    if start == end:
        return f"at {end} m from support 1:"
    return f"least from {start} to {end} m from support 1:"
