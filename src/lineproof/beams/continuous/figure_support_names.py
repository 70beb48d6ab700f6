"""Names of supports over their axes: plain words, since bubbles hold the names of grid lines."""

from __future__ import annotations

from collections.abc import Sequence
from itertools import pairwise

from lineproof.drawing import Runs, words
from lineproof.drawing.metrics import text_width

SIZE = 2.6
APART = 1.5


def support_names(
    numbers: Sequence[int], places: Sequence[float], low: float, high: float
) -> list[tuple[Runs, float]]:
    """Return the name of each support and the middle of its text on paper.

    ``support 1`` where all names stand apart between ``low`` and ``high``, else the numbers.
    """
    names = [words(f"support {number}") for number in numbers]
    halves = [text_width(name, SIZE) / 2 for name in names]
    middles = [min(max(x, low + half), high - half) for x, half in zip(places, halves, strict=True)]
    ends = [(x - half, x + half) for x, half in zip(middles, halves, strict=True)]
    if all(before[1] + APART <= after[0] for before, after in pairwise(ends)):
        return list(zip(names, middles, strict=True))
    return [(words(str(number)), x) for number, x in zip(numbers, places, strict=True)]
