"""What another way to a value gives, and what the ways work with."""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Mapping
from dataclasses import dataclass

from lineproof.audit.claims.propagate import Form, Worker, World
from lineproof.audit.data import Claim, Interval
from lineproof.audit.graph import Graph, Node


@dataclass(frozen=True, slots=True)
class Other:
    """What another way gives, and the sentence that names it.

    ``replaced`` are the ids of the lines that it works otherwise, ``took`` of those whose values
    it uses in their place. ``is_read`` tells that it was read from a table and not worked.
    """

    sentence: str
    interval: Interval
    replaced: tuple[str, ...] = ()
    took: tuple[str, ...] = ()
    is_read: bool = False


@dataclass(frozen=True, slots=True)
class Bench:
    """What the ways work with: the graph, its functions, a world of values, and the claims."""

    worker: Worker
    world: World
    claims: Mapping[str, Claim]

    @property
    def graph(self) -> Graph:
        """The record as a graph."""
        return self.worker.graph

    def reworked(self, node: Node, swapped: Mapping[str, Form]) -> Form:
        """Work a line with other forms of some that it rests on; claimed lines stay as claimed."""
        if node.id in swapped:
            return swapped[node.id]
        made = dict(self.world.used) | dict(swapped)
        moved = set(self.graph.below(swapped))
        between = (moved & set(self.graph.above([node.id]))) - set(self.claims) - set(swapped)
        for entry_id in self.graph.nodes:
            if entry_id in between and self.graph[entry_id].is_computed:
                made[entry_id] = self.worker.form(self.graph[entry_id], made)
        return self.worker.form(node, made)

    def by(
        self, node: Node, swapped: Mapping[str, Form], sentence: str, took: Iterable[str] = ()
    ) -> Iterator[Other]:
        """Give a line worked with other forms of some that it rests on, as another way.

        A way is taken as a whole: where a line that it works otherwise is claimed with the value
        of the recorded way, what rests on it was not worked by the other.
        """
        above = set(self.graph.above([node.id]))
        for entry_id in above.intersection(swapped):
            claim = self.claims.get(entry_id)
            if claim is not None and not claim.stands_for.overlaps(swapped[entry_id].interval):
                return
        yield Other(sentence, self.reworked(node, swapped).interval, tuple(swapped), tuple(took))

    def beside(self, node: Node, symbol: str) -> Form | None:
        """Return the form of a symbol in the part of a line, if it stands there."""
        return self.world.used.get(f"{node.part}/{symbol}")

    def above(self, node: Node, symbols: tuple[str, ...]) -> Form | None:
        """Return the form of the first of some names that a line, or what it rests on, uses.

        Looked for in the line, in those that it names, and in those above in the same part.
        """
        above = [self.graph[i] for i in reversed(self.graph.above([node.id]))]
        named = set(node.args.values())
        near = [node, *(n for n in above if n.id in named or n.part == node.part)]
        for symbol in symbols:
            for user in near:
                if symbol in user.args:
                    return self.world.used[user.args[symbol]]
        return None

    def meant(self, node: Node, part: str, symbol: str) -> list[Form]:
        """Return the forms that a symbol has in a line and in a part, or of all in the calc.

        Neither beta nor theta names the strengths that limit a method: V_c and V_s beside them do.
        """
        near = (n for n in self.graph if n.part == part or n.id == node.id)
        ids = {n.args[symbol] for n in near if symbol in n.args}
        ids = ids or {n.id for n in self.graph if n.has_value and n.symbol == symbol}
        return [self.world.used[i] for i in ids]
