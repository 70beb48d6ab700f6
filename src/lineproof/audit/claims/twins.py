"""Values that stand in several parts: one claimed differently was likely changed in all of them."""

from __future__ import annotations

from collections.abc import Container, Hashable, Mapping, Sequence

from lineproof.audit.data import Claim
from lineproof.audit.graph import Graph, Node


def twins_of(
    graph: Graph, deviating: Sequence[Claim], claimed: Container[str]
) -> Mapping[str, str]:
    """Return, by id, the claimed line whose value a line that nobody claimed would repeat.

    Twins are inputs of the same symbol, unit and value, and lines of the same formula on twins.
    Where the claimed ones of a group disagree, nobody knows which value the others repeat.
    """
    if not deviating:
        return {}
    keys = _keys(graph)
    wrong = {claim.id: claim for claim in deviating}
    groups: dict[int, list[str]] = {}
    for entry_id, key in keys.items():
        groups.setdefault(key, []).append(entry_id)
    found: dict[str, str] = {}
    for key in dict.fromkeys(keys[claim.id] for claim in deviating):
        group = groups[key]
        told = [entry_id for entry_id in group if entry_id in claimed]
        values = {wrong[i].value if i in wrong else None for i in told}
        if len(values) == 1 and None not in values:
            found |= {i: told[0] for i in group if i not in claimed}
    return found


def _keys(graph: Graph) -> dict[str, int]:
    """Return a number per line that twins have in common."""
    numbers: dict[Hashable, int] = {}
    keys: dict[str, int] = {}
    for node in graph:
        if node.has_value:
            keys[node.id] = numbers.setdefault(_key(graph, node, keys), len(numbers))
    return keys


def _key(graph: Graph, node: Node, keys: Mapping[str, int]) -> Hashable:
    if not node.is_computed:
        return node.symbol, node.unit, graph.stored[node.id]
    if node.tree is None:
        return node.id  # found values are found once
    args = tuple(sorted((name, keys[target]) for name, target in node.args.items()))
    return node.entry["formula"], node.unit, args
