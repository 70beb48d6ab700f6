"""Lines worked from a value that was written down wrongly: used right, whatever was claimed.

A slip of the pen stands in the table alone: what rests on it was worked from the value itself,
which nobody wrote down. Beside other slips above, that is neither the claimed nor the right value,
but what follows for the line from the values claimed.
"""

from __future__ import annotations

from collections.abc import Iterable

from lineproof.audit.claims.bench import Bench
from lineproof.audit.claims.worlds import next_claimed
from lineproof.audit.data import Claim
from lineproof.audit.graph import Node
from lineproof.formula.compiled import NOT_COMPUTED


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
        except NOT_COMPUTED:
            continue
    return False


def worked_rightly(bench: Bench, node: Node, claim: Claim, wrong: Iterable[str]) -> str | None:
    """Return the wrong line above that a claim follows from once it is what should follow there.

    ``wrong`` are claimed lines next above that do not follow from their own values. One alone is
    taken: of two that were both written wrongly and both used rightly, by chance some would fit.
    """
    for entry_id in wrong:
        swapped = {entry_id: bench.world.follows[entry_id]}
        try:
            made = bench.reworked(node, swapped)
        except NOT_COMPUTED:
            continue
        if claim.stands_for.meets(made.interval):
            return entry_id
    return None
