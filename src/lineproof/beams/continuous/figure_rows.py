"""Texts placed in rows so that they do not touch: shared by the figures along a beam."""

from __future__ import annotations

from bisect import bisect_left
from collections.abc import Sequence
from itertools import pairwise

APART = 1.6
ROUNDS, SETTLED = 300, 1e-4


def side_by_side(
    widths: Sequence[float], wanted: Sequence[float], low: float, high: float, apart: float = APART
) -> list[float]:
    """Return the middles of texts in one row near where they are wanted, within low and high.

    They keep their order. An empty list tells that the row is too short for them.

    >>> side_by_side([10.0, 10.0], [20.0, 25.0], 0.0, 100.0, 2.0)
    [16.5, 28.5]
    """
    if not widths or sum(widths) + apart * (len(widths) - 1) > high - low:
        return []
    order = sorted(range(len(wanted)), key=lambda index: wanted[index])
    places = [wanted[index] for index in order]
    sizes = [widths[index] for index in order]
    for _ in range(ROUNDS):
        before = list(places)
        for left, right in pairwise(range(len(places))):
            lack = (sizes[left] + sizes[right]) / 2 + apart - (places[right] - places[left])
            if lack > 0.0:
                places[left] -= lack / 2
                places[right] += lack / 2
        places = [
            min(max(place, low + size / 2), high - size / 2)
            for place, size in zip(places, sizes, strict=True)
        ]
        if max(abs(a - b) for a, b in zip(before, places, strict=True)) < SETTLED:
            break
    places = _pushed(places, sizes, low, high, apart)
    result = [0.0] * len(places)
    for index, place in zip(order, places, strict=True):
        result[index] = round(place, 6)
    return result


def between(
    widths: Sequence[float],
    wanted: Sequence[float],
    low: float,
    high: float,
    lines: Sequence[float],
    apart: float = APART,
) -> list[float]:
    """Return the middles of texts in one row that stand clear of upright ``lines`` as well.

    Each stays on its side of a line; those outside the outer lines may move inside. An empty list
    tells that there is no room.

    >>> between([4.0, 4.0], [9.0, 11.0], 0.0, 30.0, [10.0], 2.0)
    [7.0, 13.0]
    """
    groups: list[list[int]] = [[] for _ in range(len(lines) + 1)]
    for index, x in enumerate(wanted):
        groups[bisect_left(lines, x)].append(index)
    edges = [low - apart / 2, *lines, high + apart / 2]
    rooms = [(a + apart / 2, b - apart / 2) for a, b in pairwise(edges)]
    for outer, inner in ((0, 1), (len(lines), len(lines) - 1)) if lines else ():
        needed = sum(widths[i] + apart for i in groups[outer]) - apart
        if needed > rooms[outer][1] - rooms[outer][0]:
            groups[inner] += groups[outer]
            groups[outer] = []
    made = [0.0] * len(widths)
    for group, (start, end) in zip(groups, rooms, strict=True):
        group.sort()
        found = side_by_side(
            [widths[i] for i in group], [wanted[i] for i in group], start, end, apart
        )
        if len(found) < len(group):
            return []
        for index, place in zip(group, found, strict=True):
            made[index] = place
    return made


def _pushed(
    places: Sequence[float], sizes: Sequence[float], low: float, high: float, apart: float
) -> list[float]:
    """Push what still touches to the right, then back from the right end."""
    moved: list[float] = []
    edge = low
    for place, size in zip(places, sizes, strict=True):
        moved.append(max(place, edge + size / 2))
        edge = moved[-1] + size / 2 + apart
    edge = high
    for index in range(len(moved) - 1, -1, -1):
        moved[index] = min(moved[index], edge - sizes[index] / 2)
        edge = moved[index] - sizes[index] / 2 - apart
    return moved


def in_rows(
    widths: Sequence[float], wanted: Sequence[float], low: float, high: float
) -> list[tuple[int, float]]:
    """Return row and middle of each text: one row if they fit, else neighbours in other rows."""
    count = len(widths)
    for rows in range(1, count + 1):
        placed: list[tuple[int, float]] = [(0, 0.0)] * count
        complete = True
        for row in range(rows):
            mine = list(range(row, count, rows))
            middles = side_by_side([widths[i] for i in mine], [wanted[i] for i in mine], low, high)
            complete = complete and len(middles) == len(mine)
            for index, middle in zip(mine, middles, strict=False):
                placed[index] = (row, middle)
        if complete:
            return placed
    return [(index, min(max(x, low), high)) for index, x in enumerate(wanted)]
