"""Worlds of claims: as claimed, put right, changed in all parts; inputs that were really used."""

from __future__ import annotations

from collections.abc import Container, Iterable, Mapping
from dataclasses import dataclass

from lineproof.audit.claims.propagate import World
from lineproof.audit.data import Claim, Interval
from lineproof.audit.graph import Graph, Node

_SAME_INPUT = 0.01
"""An input is worked with as it is typed: within its digits it is the same one where it differs by
so little, as 25 mm for a bar of 25.2 mm; 0.6 is not 0.65 rounded, nor 8 m a span of 8.4 m."""


def as_recorded(graph: Graph, claim: Claim) -> bool:
    """Tell whether a claim is the recorded value, to its digits; an input also nearly in size."""
    right = graph.stored[claim.id]
    near = graph[claim.id].is_computed or abs(claim.value - right) <= _SAME_INPUT * abs(right)
    return near and claim.stands_for.holds(right)


@dataclass(frozen=True, slots=True)
class Worlds:
    """The record worked with values as claimed, with wrong ones put right, and with twins."""

    claimed: World
    sound: World
    twin: World

    def around(self, node: Node) -> list[Interval]:
        """Return what a line may be: from the values claimed, put right, and as recorded."""
        follows = [w.follows[node.id].interval for w in (self.claimed, self.sound)]
        # As recorded too: a spreadsheet shows rounded numbers and works with all their digits.
        return [*follows, Interval(node.stored, node.stored)]


def unmoved_lines(
    graph: Graph, claims: Mapping[str, Claim], worlds: Worlds
) -> dict[str, tuple[str, ...]]:
    """Return lines that kept the recorded value although an input that they use was changed.

    By line the ids of these inputs. An input counts as changed where one of its lines follows it,
    where one line alone rests on it, or where it is a count, of bars or legs, and the area is that
    of another count; where several lines rest on it and none follows, it was written wrongly.
    """
    found: dict[str, list[str]] = {}
    for claim in claims.values():
        if graph[claim.id].is_computed or as_recorded(graph, claim):
            continue
        lines = [i for i in next_claimed(graph, claim.id, claims) if _is_moved(i, worlds)]
        follow = [i for i in lines if _follows(claims[i], worlds)]
        if follow or len(lines) == 1 or _is_count(graph[claim.id]):
            for entry_id in lines:
                if entry_id not in follow:
                    found.setdefault(entry_id, []).append(claim.id)
    return {entry_id: tuple(ids) for entry_id, ids in found.items()}


def _is_count(node: Node) -> bool:
    return not node.unit and node.symbol.startswith("n_") and node.stored == int(node.stored)


def next_claimed(graph: Graph, entry_id: str, claims: Container[str]) -> list[str]:
    """Return the claimed lines that rest on one by lines that nobody claimed."""
    return _claimed_by(graph.users, graph, entry_id, claims)


def claimed_above(graph: Graph, entry_id: str, claims: Container[str]) -> list[str]:
    """Return the claimed lines that one rests on by lines that nobody claimed."""
    return _claimed_by(graph.sources, graph, entry_id, claims)


def _claimed_by(
    steps: Mapping[str, Iterable[str]], graph: Graph, entry_id: str, claims: Container[str]
) -> list[str]:
    """Return the claimed lines that are reached by steps over lines that nobody claimed."""
    waiting, found = [entry_id], list[str]()
    seen: set[str] = set()
    while waiting:
        for other in steps[waiting.pop()]:
            if other in seen or not graph[other].has_value:
                continue
            seen.add(other)
            (found if other in claims else waiting).append(other)
    return found


def _is_moved(entry_id: str, worlds: Worlds) -> bool:
    claimed, sound = (w.follows[entry_id].interval for w in (worlds.claimed, worlds.sound))
    return not claimed.meets(sound)


def _follows(claim: Claim, worlds: Worlds) -> bool:
    return claim.stands_for.meets(worlds.claimed.follows[claim.id].interval)
