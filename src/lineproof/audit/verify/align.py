"""Two sequences side by side: where what is printed departs from what the record prints."""

from __future__ import annotations

from bisect import bisect_left
from collections.abc import Hashable, Sequence
from difflib import SequenceMatcher
from typing import NamedTuple

_GRAM = 6
"""So many equal items in a row tell that two sequences run together again."""
_STRIDE = 512
_FINEST = 250_000


class Gap(NamedTuple):
    """Items ``first`` to ``last`` of one sequence stand against ``start`` to ``end`` of another."""

    first: int
    last: int
    start: int
    end: int


def gaps(one: Sequence[Hashable], other: Sequence[Hashable]) -> list[Gap]:
    """Return where two sequences differ, in order.

    >>> gaps("abcdefghijk", "abcdeXfghijk"), gaps("abcdefghijk", "abcdeghijk")
    ([Gap(first=5, last=5, start=5, end=6)], [Gap(first=5, last=6, start=5, end=5)])
    """
    found: list[Gap] = []
    i = j = 0
    search: _Search | None = None
    while True:
        step = _common(one, other, i, j)
        i, j = i + step, j + step
        if i == len(one) and j == len(other):
            return found
        search = search or _Search(one, other)
        forth, back = search.together(i, j)
        found += _finer(one, other, Gap(i, i + forth, j, j + back))
        i, j = i + forth, j + back


def _common(one: Sequence[Hashable], other: Sequence[Hashable], i: int, j: int) -> int:
    """Return how many items from two places on are equal."""
    start, most = i, min(len(one) - i, len(other) - j)
    stop = i + most
    while i + _STRIDE <= stop and one[i : i + _STRIDE] == other[j : j + _STRIDE]:
        i, j = i + _STRIDE, j + _STRIDE
    while i < stop and one[i] == other[j]:
        i, j = i + 1, j + 1
    return i - start


class _Search:
    """Finds where two sequences run together again."""

    def __init__(self, one: Sequence[Hashable], other: Sequence[Hashable]) -> None:
        self.one, self.other = one, other
        self.places: dict[tuple[Hashable, ...], list[int]] = {}
        for place in range(len(other) - _GRAM + 1):
            self.places.setdefault(tuple(other[place : place + _GRAM]), []).append(place)

    def together(self, i: int, j: int) -> tuple[int, int]:
        """Return how many items to pass over in each, together as few as can be."""
        best = (len(self.one) - i, len(self.other) - j)
        for forth in range(len(self.one) - i):
            if forth >= sum(best):
                break
            gram = tuple(self.one[i + forth : i + forth + _GRAM])
            if len(gram) < _GRAM:
                break
            places = self.places.get(gram, [])
            at = bisect_left(places, j)
            if at < len(places) and forth + places[at] - j < sum(best):
                best = (forth, places[at] - j)
        return best


def _finer(one: Sequence[Hashable], other: Sequence[Hashable], gap: Gap) -> list[Gap]:
    """Part a short gap into its own differences."""
    first, last, start, end = gap
    if (last - first) * (end - start) > _FINEST or first == last or start == end:
        return [gap]
    matcher = SequenceMatcher(None, one[first:last], other[start:end], autojunk=False)
    return [
        Gap(first + a, first + b, start + c, start + d)
        for kind, a, b, c, d in matcher.get_opcodes()
        if kind != "equal"
    ]
