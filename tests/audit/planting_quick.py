"""The quick table: inputs and governing results only, and where a slip between them must show."""

from __future__ import annotations

import math
from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass

from lineproof.audit.claims.blank import quick_lines
from lineproof.audit.data import Claim, Interval
from lineproof.audit.graph import Graph

from .planting import Sheet, chosen, sheet_with
from .planting_slips import Planted

A_BEAM = 3
"""Slips tried on the quick table of one beam, each on a table of its own."""


@dataclass(frozen=True)
class Quick:
    """A quick table with one slip behind it: the claims, and the ones at which it must show.

    ``below`` are all lines that rest on it, ``later`` the claims that rest on it through others.
    """

    slip: Planted
    claims: Mapping[str, Claim]
    shows_at: tuple[str, ...]
    below: frozenset[str]
    later: frozenset[str]


def quick_tables(graph: Graph, number: int, seed: int = 0) -> Iterator[Quick]:
    """Give quick tables of a beam, each with another of the slips that were chosen for it."""
    slips = [slip for slip in chosen(graph, number, seed) if slip.written is None]
    for turn in range(A_BEAM):
        slip = slips[(number // 5 + turn * len(slips) // A_BEAM) % len(slips)]
        sheet = sheet_with(graph, [slip])
        ids = quick_lines(graph)
        if sheet.planted and all(n in ids for n, _ in slip.inputs):
            yield _table(sheet, slip, ids)


def _table(sheet: Sheet, slip: Planted, ids: Sequence[str]) -> Quick:
    graph, claims = sheet.graph, sheet.claims(ids)
    below = {slip.id, *graph.below([slip.id]), *(n for n, _ in slip.inputs)}
    first = [i for i in ids if i in below and slip.id in behind(graph, i, claims)]
    shows = [i for i in first if not reach(graph, i, claims).meets(claims[i].stands_for)]
    later = {i for i in ids if i in below and i not in first}
    return Quick(slip, claims, tuple(shows), frozenset(below), frozenset(later))


def behind(graph: Graph, entry_id: str, claims: Mapping[str, Claim]) -> set[str]:
    """Return a claimed line and the lines above it up to the next claimed ones."""
    waiting, found = [entry_id], {entry_id}
    while waiting:
        for target in graph.sources.get(waiting.pop(), ()):
            if target not in claims and target not in found and target in graph.nodes:
                found.add(target)
                waiting.append(target)
    return found


def reach(graph: Graph, entry_id: str, claims: Mapping[str, Claim], digits: int = 0) -> Interval:
    """Return what a claimed line can be if those above it are anywhere in what they stand for.

    Each of them goes to its ends alone, the others stay; the moves are summed. With ``digits``
    the lines between, which nobody claimed, are rounded to so many as well.
    """
    inner = behind(graph, entry_id, claims)
    order = [i for i in graph.nodes if i in inner]
    used = {t for i in order for t in graph.sources[i] if t in claims}
    typed = {i: claims[i].value for i in used}

    def worked(changed: Mapping[str, float]) -> float:
        values = dict(graph.stored) | typed | dict(changed)
        for i in order:
            if graph[i].is_computed and i not in changed:
                values[i] = graph[i].compute(graph.named(graph[i], values))
        return values[entry_id]

    middle = worked({})
    low = high = middle
    for i in used:
        ends = [worked({i: e}) for e in (claims[i].stands_for.low, claims[i].stands_for.high)]
        low += min(*ends, middle) - middle
        high += max(*ends, middle) - middle
    for i in order if digits else ():
        value = graph.stored[i] if graph[i].is_computed and i != entry_id else 0.0
        half = 0.5 * 10.0 ** (math.floor(math.log10(abs(value))) + 1 - digits) if value else 0.0
        ends = [worked({i: value - half}), worked({i: value + half})] if half else [middle]
        low += min(*ends, middle) - middle
        high += max(*ends, middle) - middle
    return Interval(low, high)
