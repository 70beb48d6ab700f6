"""From a line that nobody claimed on to the claim: what the claim becomes if that line changes."""

from __future__ import annotations

from collections.abc import Callable, Container, Sequence
from dataclasses import dataclass

from lineproof.audit.graph import Node
from lineproof.audit.slip_scope import Pairs, Scope
from lineproof.audit.slip_tree import FAILURES, Places, real
from lineproof.errors import UserError

STRAIGHT = 1e-9
"""A way bent by less than this part of its values counts as straight."""
MOST_LINES = 40
"""So many unclaimed lines above a claim are searched, the nearest first."""


@dataclass(frozen=True, slots=True)
class Reach:
    """The unclaimed lines above a claim, nearest first, each with its distance; and its leaves.

    ``leaves`` are givens and looked-up values that more than one of these lines use.
    """

    target: str
    lines: dict[str, int]
    leaves: dict[str, int]


def reach_of(scope: Scope, target: str, claimed: Container[str]) -> Reach:
    """Return what a claim rests on without passing through another claim."""
    lines: dict[str, int] = {target: 0}
    uses: dict[str, int] = {}
    edge = [target]
    distance = 0
    while edge and len(lines) <= MOST_LINES:
        distance += 1
        found: dict[str, None] = {}
        for entry_id in edge:
            for source in scope.graph.sources[entry_id]:
                if source not in scope.units or source in claimed:
                    continue
                if scope.graph[source].is_computed:
                    found |= {} if source in lines else {source: None}
                else:
                    uses[source] = uses.get(source, 0) + 1
        edge = list(found)
        lines |= dict.fromkeys(edge, distance)
    del lines[target]
    kept = dict(list(lines.items())[:MOST_LINES])
    leaves = {entry_id: 1 for entry_id, times in uses.items() if times > 1}
    return Reach(target, kept, leaves)


def carry(scope: Scope, pairs: Pairs, reach: Reach, changed: str) -> Onward | None:
    """Return the claim's value as a function of one unclaimed line or leaf above it.

    None where the way there cannot be worked quickly. It raises where there is no value.
    """
    graph = scope.graph
    touched = {changed}
    steps: list[Step] = []
    within = {*reach.lines, reach.target}
    for entry_id in sorted(within, key=scope.order.__getitem__):
        node = graph[entry_id]
        if entry_id == changed or touched.isdisjoint(node.args.values()):
            continue
        touched.add(entry_id)
        steps.append(_step(scope, pairs, node, touched))
    if not steps or steps[-1].entry_id != reach.target:
        return None
    onward = _composed(steps, changed)
    slow = any(graph[step.entry_id].tree is None for step in steps)
    if not slow:
        return Onward(onward, onward)
    straight = _straight(onward, pairs[changed][0])
    return None if straight is None else Onward(straight, onward)


@dataclass(frozen=True, slots=True)
class Onward:
    """The way on to the claim: ``quick`` to look for fits, ``exact`` to work them out."""

    quick: Callable[[float], float]
    exact: Callable[[float], float]


def _straight(onward: Callable[[float], float], here: float) -> Callable[[float], float] | None:
    """Return a way that runs through a found value as a straight line, if it is one.

    Support moments are proportional to loads, and a run of the procedure costs a thousand lines.
    """
    step = abs(here) or 1.0
    try:
        low, middle, high = onward(here), onward(here + step / 2), onward(here + step)
    except FAILURES:
        return None
    if abs(high - 2 * middle + low) > STRAIGHT * max(abs(low), abs(high)):
        return None
    slope = (high - low) / step
    return lambda value: low + slope * (value - here)


@dataclass(frozen=True, slots=True)
class Step:
    """One line on the way: how its value follows from those that have changed before."""

    entry_id: str
    work: Callable[[dict[str, float]], float]


def _step(scope: Scope, pairs: Pairs, node: Node, touched: set[str]) -> Step:
    named = {name: pairs[target][0] for name, target in node.args.items()}
    moving = [(name, target) for name, target in node.args.items() if target in touched]
    if node.tree is None:
        return Step(node.id, lambda now: _found(node, named, moving, now))
    places = Places(scope.places(node), {name: pairs[t] for name, t in node.args.items()})
    at = [(k, target) for name, target in moving for k in places.uses(name)]
    if len(at) == 1:
        only, source = at[0]
        return Step(node.id, lambda now: places.with_place(only, now[source]))
    return Step(
        node.id, lambda now: places.with_places({k: (now[target], 0.0) for k, target in at})[0]
    )


def _found(
    node: Node,
    named: dict[str, float],
    moving: Sequence[tuple[str, str]],
    now: dict[str, float],
) -> float:
    try:
        return real(node.compute(named | {name: now[target] for name, target in moving}))
    except UserError as error:
        raise ValueError(str(error)) from error


def _composed(steps: Sequence[Step], changed: str) -> Callable[[float], float]:
    def carried(value: float) -> float:
        now = {changed: value}
        for step in steps:
            now[step.entry_id] = step.work(now)
        return now[steps[-1].entry_id]

    return carried


def carried_or_none(function: Callable[[float], float], value: float) -> float | None:
    """Return what a function gives, or None where it gives no real number."""
    try:
        return function(value)
    except FAILURES:
        return None
