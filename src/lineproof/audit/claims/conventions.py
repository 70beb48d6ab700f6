"""Moments claimed with the opposite sign throughout: another sign convention, no error.

One engineer writes hogging moments negative, the other positive. Where every claimed moment of a
kind has the sign opposite to the calc's, the claims are read in the calc's own signs; a single
one of opposite sign among others is a slip.
"""

from __future__ import annotations

from collections.abc import Container, Hashable, Iterable, Iterator, Mapping, Sequence
from dataclasses import dataclass, replace

from lineproof.audit.data import Claim, Judged
from lineproof.audit.graph import Graph, Node, Number
from lineproof.audit.slips.scope import stem
from lineproof.quantity.units import UNITS

LEAST = 2
"""One moment alone says nothing of a convention."""
MOSTLY = 0.5
"""A symbol counts as negative in the calc if more than so much of its values are."""
NEARLY = 0.01
"""Relative difference within which a line follows: claims of three digits carry half of it."""
_MOMENT = "N.mm"
_MOST_NAMED = 4


@dataclass(frozen=True, slots=True)
class Convention:
    """Claimed moments that have the sign opposite to the calc's; the sentence is empty for none."""

    ids: frozenset[str] = frozenset()
    sentence: str = ""


def convention_of(graph: Graph, claims: Sequence[Claim]) -> Convention:
    """Return the claimed moments whose kind is claimed with the opposite sign throughout.

    Moments of all symbols that the calc counts as negative are one kind: a few of them may be
    positive under pattern loads. Of a symbol that is positive in the calc, hogging and sagging
    moments are kinds of their own, told apart by the sort of part. A moment that stands in
    several parts is one moment. Where a claimed line is worked of such a moment as it is written,
    minus and all, the signs are no convention.
    """
    negative = _negative(graph)
    groups: dict[Hashable, list[Claim]] = {}
    for claim in claims:
        if _has_sign(graph, claim):
            groups.setdefault(_kind(graph[claim.id], negative), []).append(claim)
    found = [
        claim
        for group in groups.values()
        if len({_moment_of(graph[claim.id]) for claim in group}) >= LEAST
        and all(_is_opposite(graph, claim) for claim in group)
        and not _worked_as_written(graph, claims, group)
        for claim in group
    ]
    return _told(graph, found)


def _worked_as_written(graph: Graph, claims: Sequence[Claim], group: Sequence[Claim]) -> bool:
    """Tell whether a claimed line follows from moments of a group with their signs, not turned."""
    known = {claim.id: claim for claim in claims}
    written = graph.stored | {claim.id: claim.value for claim in claims}
    turned = written | {claim.id: -claim.value for claim in group}
    own = {claim.id for claim in group}
    below = ({user for i in own for user in graph.users[i]} & known.keys()) - own
    return any(
        _follows(graph, known[user], written) and not _follows(graph, known[user], turned)
        for user in below
        if graph[user].tree is not None
    )


def _follows(graph: Graph, claim: Claim, values: Mapping[str, Number]) -> bool:
    """Tell whether a claim is, nearly, what its formula gives of these values."""
    node = graph[claim.id]
    try:
        found = node.compute(graph.named(node, values))
    except (ArithmeticError, ValueError):
        return False
    return abs(found - claim.value) <= NEARLY * abs(claim.value)


def in_our_signs(claims: Sequence[Claim], convention: Convention) -> list[Claim]:
    """Return claims with those of another sign convention read in the calc's own signs."""
    return [_turned(claim) if claim.id in convention.ids else claim for claim in claims]


def as_typed(judged: Iterable[Judged], claims: Iterable[Claim]) -> Iterator[Judged]:
    """Give judgements with what was typed, whatever sign it was read with."""
    typed = {claim.id: claim.typed for claim in claims}
    for each in judged:
        claim = each.claim
        if claim is None or claim.typed == typed[claim.id]:
            yield each
        else:
            yield replace(each, claim=replace(claim, typed=typed[claim.id]))


def _has_sign(graph: Graph, claim: Claim) -> bool:
    return (
        UNITS[graph[claim.id].unit].internal == _MOMENT
        and bool(graph.stored[claim.id])
        and not claim.stands_for.holds(0.0)
    )


def _is_opposite(graph: Graph, claim: Claim) -> bool:
    return (claim.value < 0) != (graph.stored[claim.id] < 0)


def _negative(graph: Graph) -> frozenset[str]:
    """Return the symbols of moments, without the number of their place, mostly negative here."""
    signs: dict[str, list[bool]] = {}
    for node in graph:
        if node.has_value and UNITS[node.unit].internal == _MOMENT:
            signs.setdefault(stem(node.symbol), []).append(graph.stored[node.id] < 0)
    return frozenset(own for own, all_ in signs.items() if sum(all_) > MOSTLY * len(all_))


def _kind(node: Node, negative: Container[str]) -> Hashable:
    own = stem(node.symbol)
    return "negative" if own in negative else (own, node.part.partition("-")[0])


def _moment_of(node: Node) -> Hashable:
    """Return what tells one moment from another: what it is worked of, else its own id."""
    same = node.tree is not None and (node.tree, tuple(sorted(node.args.items())))
    return same or node.id


def _turned(claim: Claim) -> Claim:
    typed = claim.typed[1:] if claim.typed.startswith("-") else f"-{claim.typed}"
    return replace(claim, typed=typed, value=-claim.value, stands_for=claim.stands_for.times(-1))


def _told(graph: Graph, claims: Sequence[Claim]) -> Convention:
    if not claims:
        return Convention()
    symbols = list(dict.fromkeys(graph[claim.id].symbol for claim in claims))
    named = ", ".join(symbols[:_MOST_NAMED]) + (" and more" if len(symbols) > _MOST_NAMED else "")
    return Convention(
        frozenset(claim.id for claim in claims),
        f"{len(claims)} claimed moments ({named}) have the sign opposite to the calc's throughout: "
        "read as another sign convention, not as errors. See that theirs is stated.",
    )
