"""The slips behind the claims of one table, without those that explain nothing."""

from __future__ import annotations

from collections.abc import Callable, Mapping

from lineproof.audit.claims.copies import stands_alone, without_circles, without_results
from lineproof.audit.claims.on_the_way import OnTheWay, as_rounded
from lineproof.audit.claims.worlds import Worlds
from lineproof.audit.data import Claim, Interval, Slip
from lineproof.audit.graph import Graph, Node
from lineproof.audit.slips.rank import without_underscore
from lineproof.audit.slips.search import searching

SlipFinder = Callable[
    [Graph, str, Mapping[str, Interval], Claim, Mapping[str, str]], tuple[Slip, ...]
]
"""Looks for the slip behind a claim: graph, line, values used, claim, and the table as typed."""


class Sought:
    """Looks for slips with the values of a table; keeps which of its lines stand alone."""

    def __init__(
        self,
        graph: Graph,
        claims: Mapping[str, Claim],
        worlds: Worlds,
        way: OnTheWay,
        find: SlipFinder,
    ) -> None:
        self.graph, self.claims, self.worlds, self.way = graph, claims, worlds, way
        self.find, self.find_rounded = find, searching()
        self.typed = {claim.id: claim.typed for claim in claims.values()}
        self.used = {i: form.interval for i, form in worlds.claimed.used.items()}
        self.rounded = as_rounded(graph, self.used, claims)
        self.order = {entry_id: at for at, entry_id in enumerate(graph.nodes)}
        self._alone: dict[str, bool] = {}

    def slips(self, node: Node, claim: Claim) -> tuple[Slip, ...]:
        """Return the slips behind a claim, the likeliest first."""
        below, stored = set(self.graph.below([node.id])), self.graph.stored
        found = self.find(self.graph, node.id, self.used, claim, self.typed)
        known = any(cause.usual for slip in found[:1] for cause in slip.causes)
        if not known and self.way.is_open(node):
            # What was worked from lines that nobody shows has the digits of these as well.
            again = self.find_rounded(self.graph, node.id, self.rounded, claim, self.typed)
            usual = (s for s in again if any(c.usual and not c.above for c in s.causes))
            found = (*usual, *found) or again
        slips = without_results(
            found,
            claim,
            lambda i: i in below and not self.used[i].holds(stored[i]),
        )
        later = self.order[node.id].__lt__
        told = without_circles(slips, claim, self._is_alone, lambda i: later(self.order[i]))
        return tuple(map(without_underscore, told))

    def _is_alone(self, entry_id: str) -> bool:
        """Tell whether a claimed line follows from nothing, nor is a rounding of it."""
        if entry_id not in self._alone:
            claim = self.claims.get(entry_id)
            if claim is None or not (node := self.graph[entry_id]).is_computed:
                self._alone[entry_id] = False
            else:
                self._alone[entry_id] = stands_alone(claim, node.symbol, self.worlds.around(node))
        return self._alone[entry_id]
