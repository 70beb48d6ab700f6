"""A sum divided otherwise: its terms differ from the recorded ones, the sum of all is right.

The weight of a T-beam is the slab over its whole width and the web below it, or the web over its
whole depth and the slab between the webs. Neither term of the one is a term of the other, and
neither is an error.
"""

from __future__ import annotations

from collections.abc import Iterable, Iterator

from lineproof.audit.claims.bench import Bench
from lineproof.audit.claims.worlds import next_claimed
from lineproof.audit.graph import Node
from lineproof.formula.compiled import NOT_COMPUTED
from lineproof.formula.tree import Binary, Name, Tree


def divided_terms(bench: Bench) -> dict[str, tuple[str, ...]]:
    """Return by claimed line those that make up for it in a right sum: ids of terms, then the sum.

    A sum counts that was claimed right and follows from its terms as claimed, though no longer with
    any one of the wrong ones put right. Every claimed line below such a term must be such a sum.
    """
    sums = {node.id: terms for node in _sums(bench) if (terms := _made_up(bench, node))}
    found: dict[str, tuple[str, ...]] = {}
    for total, terms in sums.items():
        for term in terms:
            below = next_claimed(bench.graph, term, bench.claims)
            if term not in found and set(below) <= set(sums):
                found[term] = (*(other for other in terms if other != term), total)
    return {t: others for t, others in found.items() if set(others[:-1]) <= set(found)}


def _sums(bench: Bench) -> Iterator[Node]:
    for entry_id, claim in bench.claims.items():
        node = bench.graph[entry_id]
        if node.tree is None or not claim.stands_for.holds(bench.graph.stored[entry_id]):
            continue
        if claim.stands_for.meets(bench.world.follows[entry_id].interval):
            yield node


def _made_up(bench: Bench, node: Node) -> tuple[str, ...]:
    """Return the wrong terms of a right sum, if none of them can be put right alone."""
    terms = [node.args[name] for name in _terms(node.tree) if name in node.args]
    wrong = tuple(t for t in dict.fromkeys(terms) if _is_wrong(bench, t))
    if len(wrong) < 2:  # noqa: PLR2004 - one makes up for another
        return ()
    return wrong if not any(_is_sum_without(bench, node, term) for term in wrong) else ()


def _terms(tree: Tree | None) -> Iterable[str]:
    """Return the names that a sum adds; nothing for any other formula."""
    match tree:
        case Name(name):
            return (name,)
        case Binary("+", left, right):
            first, last = tuple(_terms(left)), tuple(_terms(right))
            return (*first, *last) if first and last else ()
    return ()


def _is_wrong(bench: Bench, entry_id: str) -> bool:
    claim = bench.claims.get(entry_id)
    if claim is None or not bench.graph[entry_id].is_computed:
        return False
    return not claim.stands_for.meets(bench.world.follows[entry_id].interval)


def _is_sum_without(bench: Bench, node: Node, term: str) -> bool:
    """Tell whether a sum is as claimed with one of its terms put right."""
    try:
        made = bench.reworked(node, {term: bench.world.follows[term]})
    except NOT_COMPUTED:
        return True
    return bench.claims[node.id].stands_for.meets(made.interval)
