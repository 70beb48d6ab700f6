"""Lines worked from a value that was written down wrongly: used right, whatever was claimed.

A slip of the pen stands in the table alone: what rests on it was worked from the value itself,
which nobody wrote down. Beside other slips above, that is neither the claimed nor the right value,
but what follows for the line from the values claimed.
"""

from __future__ import annotations

from collections.abc import Container, Iterator, Sequence
from itertools import combinations

from lineproof.audit.claims.other_methods import Bench
from lineproof.audit.claims.worlds import next_claimed
from lineproof.audit.data import Claim
from lineproof.audit.graph import Graph, Node
from lineproof.errors import UserError

MOST = 4
"""So many wrong lines next above a line are tried, in every selection."""
_CANNOT = (ArithmeticError, ValueError, TypeError, UserError)


def claimed_above(graph: Graph, node: Node, claims: Container[str]) -> Iterator[str]:
    """Give the claimed lines that a line rests on by lines that nobody claimed."""
    waiting, seen = [node.id], {node.id}
    while waiting:
        for target in graph.sources[waiting.pop()]:
            if target not in seen:
                seen.add(target)
                if target in claims:
                    yield target
                else:
                    waiting.append(target)


def used_as_written(bench: Bench, entry_id: str) -> bool:
    """Tell whether a wrong value was worked on: some claim below follows from it as written only.

    Such a value is no slip of the pen, and no other line below it was worked from another.
    """
    graph, world = bench.graph, bench.world
    swapped = {entry_id: world.follows[entry_id]}
    for below in next_claimed(graph, entry_id, bench.claims):
        stands = bench.claims[below].stands_for
        if not graph[below].is_computed or not stands.meets(world.follows[below].interval):
            continue
        try:
            if not stands.meets(bench.reworked(graph[below], swapped).interval):
                return True
        except _CANNOT:
            continue
    return False


def worked_rightly(bench: Bench, node: Node, claim: Claim, wrong: Sequence[str]) -> tuple[str, ...]:
    """Return the wrong lines above that a claim follows from once they are what should follow.

    ``wrong`` are claimed lines next above that do not follow from their own values. As few as
    will do are put right; none are returned where no selection of them gives the claim.
    """
    follows = bench.world.follows
    for count in range(1, min(len(wrong), MOST) + 1):
        for chosen in combinations(wrong[:MOST], count):
            swapped = {i: follows[i] for i in chosen}
            try:
                made = bench.reworked(node, swapped)
            except _CANNOT:
                continue
            if claim.stands_for.meets(made.interval):
                return chosen
    return ()
