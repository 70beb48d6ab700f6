"""Worlds of claims: as claimed, put right, changed in all parts; inputs that were really used."""

from __future__ import annotations

from collections.abc import Container, Iterable, Mapping
from dataclasses import dataclass

from lineproof.audit.claims.propagate import Form, Worker, World, claimed_form
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


def deviating_of(graph: Graph, claims: Iterable[Claim]) -> list[Claim]:
    """Return the claims that are not the recorded values."""
    return [claim for claim in claims if not as_recorded(graph, claim)]


def worlds_of(
    worker: Worker,
    claims: Mapping[str, Claim],
    deviating: Iterable[Claim],
    twins: Mapping[str, str],
) -> Worlds:
    """Work the record with values as claimed, with the deviating ones put right, and with twins.

    ``twins`` are the claimed lines whose value lines that nobody claimed would repeat.
    """
    graph = worker.graph
    stands = {claim.id: _stands(graph, claim) for claim in claims.values()}
    needed = set(claims) | set(graph.above(claims))
    claimed = worker.world(stands, needed)
    right = {claim.id: _put_right(graph, claim) for claim in deviating}
    sound = worker.world(stands | right, needed, claimed) if right else claimed
    copies = {copy: stands[claimed_id] for copy, claimed_id in twins.items()}
    twin = worker.world(stands | copies, needed, claimed) if copies else claimed
    return Worlds(claimed, sound, twin)


def _stands(graph: Graph, claim: Claim) -> Form:
    right = graph.stored[claim.id]
    if graph[claim.id].is_computed:
        return claimed_form(claim.id, claim.stands_for)
    if not as_recorded(graph, claim):
        return Form(claim.value)  # an input is used as it was typed
    same = Interval(right, right).holds(claim.value)
    return Form(right) if same else claimed_form(claim.id, claim.stands_for)


def _put_right(graph: Graph, claim: Claim) -> Form:
    right = graph.stored[claim.id]
    if not graph[claim.id].is_computed:
        return Form(right)
    # With as many digits as were written: 20 000 for 20 leaves 0.05 open there, and not 50.
    # Never more is open than as claimed: 0.5 for 539 mm says nothing of 485 to 593.
    size = min(1.0, abs(right / claim.value)) if claim.value else 1.0
    return Form(right, {claim.id: claim.stands_for.half * size})


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
