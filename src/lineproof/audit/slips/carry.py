"""From a line that nobody claimed on to the claim: what the claim becomes if that line changes."""

from __future__ import annotations

from collections.abc import Callable, Container, Sequence
from dataclasses import dataclass, field

from lineproof.audit.graph import Node, real
from lineproof.audit.slips.edits import Line
from lineproof.audit.slips.scope import Pairs, Scope
from lineproof.audit.slips.tree import Places
from lineproof.errors import UserError
from lineproof.formula.compiled import NOT_COMPUTED

STRAIGHT = 1e-9
"""A way bent by less than this part of its values counts as straight."""
MOST_LINES = 60
"""So many unclaimed lines above a claim are searched, the nearest first."""
MOST_FOUND = 2000
"""So many found values are kept while one table of claims is searched."""

STRIDES = (24, 6, 1)
"""Of the sorted edits above a claim every so many are worked at first, then more between them."""
PROBES = (-1.0, 0.0, 1e-3, 0.5, 1.0, 2.0, 10.0, 1e3)
"""Multiples of a value that tell how far it can move a claim."""

Way = Callable[[float], float]
"""The claim's value as a function of a line above; raises where there is no value."""


@dataclass(frozen=True, slots=True)
class Reach:
    """The unclaimed lines above a claim, nearest first, each with its distance; and its leaves.

    ``leaves`` are givens and looked-up values that more than one of these lines use; ``order``
    holds the lines and the claim in the order of the record.
    """

    target: str
    lines: dict[str, int]
    leaves: dict[str, int]
    order: tuple[str, ...]


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
    order = sorted([target, *kept], key=scope.order.__getitem__)
    return Reach(target, kept, leaves, tuple(order))


@dataclass(frozen=True, slots=True)
class Onward:
    """The way on to the claim: ``quick`` to look for fits, ``exact`` to work them out."""

    quick: Way
    exact: Way


@dataclass(frozen=True, slots=True)
class Step:
    """One line on the way: how its value follows from those that have changed before."""

    entry_id: str
    work: Callable[[dict[str, float]], float]


@dataclass(frozen=True)
class Carrier:
    """Carries changed values on; lines and found values worked once are kept for the next claim."""

    scope: Scope
    pairs: Pairs
    line: Callable[[str], Line | None]
    kept: dict[tuple[str, tuple[float, ...]], float] = field(default_factory=dict)

    def onward(self, reach: Reach, changed: str) -> Onward | None:
        """Return the way from one unclaimed line or leaf on to the claim.

        None where the way cannot be worked, or not quickly.
        """
        touched = {changed}
        steps: list[Step] = []
        for entry_id in reach.order:
            node = self.scope.graph[entry_id]
            if entry_id == changed or touched.isdisjoint(node.args.values()):
                continue
            step = self._step(node, touched)
            if step is None:
                return None
            touched.add(entry_id)
            steps.append(step)
        if not steps or steps[-1].entry_id != reach.target:
            return None
        exact = _composed(steps, changed)
        if all(self.scope.graph[step.entry_id].tree is not None for step in steps):
            return Onward(exact, exact)
        straight = _straight(exact, self.pairs[changed][0])
        return None if straight is None else Onward(straight, exact)

    def _step(self, node: Node, touched: set[str]) -> Step | None:
        moving = [(name, target) for name, target in node.args.items() if target in touched]
        if node.tree is None:
            named = {name: self.pairs[target][0] for name, target in node.args.items()}
            return Step(node.id, lambda now: self._found(node, named, moving, now))
        line = self.line(node.id)
        if line is None:
            return None
        places = line.places
        at = [(k, target) for name, target in moving for k in places.uses(name)]
        if len(at) == 1:
            only, source = at[0]
            return Step(node.id, lambda now: places.with_place(only, now[source]))
        return Step(node.id, _with_many(places, at))

    def _found(
        self,
        node: Node,
        named: dict[str, float],
        moving: Sequence[tuple[str, str]],
        now: dict[str, float],
    ) -> float:
        key = (node.id, tuple(now[target] for _, target in moving))
        if key not in self.kept:
            if len(self.kept) > MOST_FOUND:
                self.kept.clear()
            try:
                changed = named | {name: now[target] for name, target in moving}
                self.kept[key] = real(node.compute(changed))
            except UserError as error:
                raise ValueError(str(error)) from error
        return self.kept[key]


def _with_many(
    places: Places, at: Sequence[tuple[int, str]]
) -> Callable[[dict[str, float]], float]:
    over = places.over(tuple(k for k, _ in at))
    return lambda now: places.with_values([(k, now[target]) for k, target in at], over)


def _composed(steps: Sequence[Step], changed: str) -> Way:
    def carried(value: float) -> float:
        now = {changed: value}
        for step in steps:
            now[step.entry_id] = step.work(now)
        return now[steps[-1].entry_id]

    return carried


def _straight(onward: Way, here: float) -> Way | None:
    """Return a way that runs through a found value as a straight line, if it is one.

    Support moments are proportional to loads, and a run of the procedure costs a thousand lines.
    """
    step = abs(here) or 1.0
    try:
        low, middle, high = onward(here), onward(here + step / 2), onward(here + step)
    except NOT_COMPUTED:
        return None
    if abs(high - 2 * middle + low) > STRAIGHT * max(abs(low), abs(high)):
        return None
    slope = (high - low) / step
    return lambda value: low + slope * (value - here)


def worked_or_none(way: Way, value: float) -> float | None:
    """Return what a way gives, or None where it gives no real number."""
    try:
        return way(value)
    except NOT_COMPUTED:
        return None


def may_reach(onward: Onward, here: float, low: float, high: float) -> bool:
    """Tell whether a line above can move the claim there at all: most of them move it little."""
    reached = [worked_or_none(onward.quick, here * times) for times in PROBES]
    known = [value for value in reached if value is not None]
    return len(known) < len(PROBES) or (min(known) <= high and max(known) >= low)


def fitting(way: Way, values: Sequence[float], low: float, high: float) -> list[int]:
    """Return which of the sorted values a way carries between low and high.

    Works some of the values, and those between two of them only where the target may lie there;
    what turns back sharply between two may be missed.
    """
    known: dict[int, float | None] = {}

    def at(index: int) -> float | None:
        if index not in known:
            known[index] = worked_or_none(way, values[index])
        return known[index]

    def look(first: int, last: int, strides: tuple[int, ...]) -> None:
        stride, *finer = strides
        for start in range(first, last, stride):
            end = min(start + stride, last)
            if finer and _may_lie_between(at(start), at(end), low, high):
                look(start, end, tuple(finer))
            elif not finer:
                at(start)

    at(0)
    look(0, len(values) - 1, STRIDES)
    at(len(values) - 1)
    return [k for k, value in known.items() if value is not None and low <= value <= high]


def _may_lie_between(first: float | None, second: float | None, low: float, high: float) -> bool:
    if first is None or second is None:
        return True
    room = abs(second - first)
    return min(first, second) - room <= high and max(first, second) + room >= low
