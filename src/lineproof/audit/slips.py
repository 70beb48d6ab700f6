"""The slip finder: which single slip reproduces a claimed value within its digits."""

from __future__ import annotations

import math
from collections.abc import Container, Iterator, Mapping, Sequence

from lineproof.audit.data import Claim, Interval, Slip
from lineproof.audit.graph import Graph
from lineproof.audit.slip_bindings import edits_of_bindings, others_for
from lineproof.audit.slip_carry import Onward, Reach, carried_or_none, carry, reach_of
from lineproof.audit.slip_edits import Edit, Line, edits_of, words_of
from lineproof.audit.slip_rank import Fit, ranked, shares
from lineproof.audit.slip_scope import Pairs, Scope, scope_of
from lineproof.audit.slip_tree import FAILURES, Places
from lineproof.audit.slip_whole import TOP, edits_of_copy, edits_of_result

FARTHER = 0.25
"""By so much (natural logarithm) a slip is less likely for each line it lies further up."""
LOOSE = 3.0
"""At first fits are sought so many widths wide; then the width of each is worked out."""
NOT_ABOVE = frozenset(("far", "mistyped constant", "mistyped argument", "place", "decimal"))
"""Large families that are not tried in lines above the claimed one: they fit anything."""


def find_slips(
    graph: Graph,
    entry_id: str,
    used: Mapping[str, Interval],
    claim: Claim,
    claimed: Container[str] = (),
) -> tuple[Slip, ...]:
    """Return the single slips that reproduce a claim, the most plausible first, eight at most.

    ``used`` gives for every value of the graph what follows from the values that the claim itself
    uses, in internal units; a value not in it is taken as recorded. The slip is sought in the
    claimed line and in the lines between it and the ``claimed`` ones above. An empty tuple says
    that no single slip known here fits.
    """
    scope = scope_of(graph)
    pairs = Pairs(graph, used)
    line = _line(scope, pairs, entry_id)
    if line is None:
        return ()
    search = _Search(scope, pairs, claim)
    fits = [*search.own(line)]
    reach = reach_of(scope, entry_id, claimed)
    for above, distance in reach.lines.items():
        fits += search.above(reach, above, distance)
    for leaf, distance in reach.leaves.items():
        fits += search.leaf(reach, leaf, distance)
    return ranked(fits, claim)


def none_fits(graph: Graph, entry_id: str) -> str:
    """Return the sentence for a claim that no single slip reproduces."""
    return f"No single slip reproduces the value claimed for {words_of(scope_of(graph), entry_id)}."


def _line(scope: Scope, pairs: Pairs, entry_id: str) -> Line | None:
    node = scope.graph[entry_id]
    named = {name: pairs[target] for name, target in node.args.items() if target in scope.units}
    if node.tree is None:
        named = {node.symbol: pairs[entry_id]}
    try:
        return Line(scope, node, Places(scope.places(node), named), pairs)
    except FAILURES:
        return None


class _Search:
    """The search for one claim."""

    def __init__(self, scope: Scope, pairs: Pairs, claim: Claim) -> None:
        self.scope, self.pairs, self.claim = scope, pairs, claim

    def own(self, line: Line) -> Iterator[Fit]:
        """Give the slips in the claimed line itself."""
        edits = [*edits_of(line), *edits_of_bindings(line)] if line.node.tree is not None else []
        edits += [*edits_of_result(line), *edits_of_copy(line, self.claim)]
        yield from self._fits(line, edits, None, 0.0, "")

    def above(self, reach: Reach, entry_id: str, distance: int) -> Iterator[Fit]:
        """Give the slips in an unclaimed line, carried on to the claim."""
        line = _line(self.scope, self.pairs, entry_id)
        onward = self._onward(reach, entry_id)
        if line is None or onward is None:
            return
        tree_edits = [*edits_of(line), *edits_of_bindings(line)] if line.node.tree else []
        edits = [e for e in (*tree_edits, *edits_of_result(line)) if e.family not in NOT_ABOVE]
        where = f", in {words_of(self.scope, entry_id)}, which carries on to the claim"
        yield from self._fits(line, edits, onward, FARTHER * distance, where)

    def leaf(self, reach: Reach, entry_id: str, distance: int) -> Iterator[Fit]:
        """Give the slips in a given or a looked-up value that several of the lines use."""
        line = _line(self.scope, self.pairs, entry_id)
        onward = self._onward(reach, entry_id)
        if line is None or onward is None:
            return
        edits = [
            Edit(o.family, TOP, o.value, o.half, o.words, o.far)
            for o in others_for(line, entry_id)
            if o.family not in NOT_ABOVE
        ]
        yield from self._fits(line, edits, onward, FARTHER * distance, ", wherever it is used")

    def _onward(self, reach: Reach, entry_id: str) -> Onward | None:
        try:
            return carry(self.scope, self.pairs, reach, entry_id)
        except FAILURES:
            return None

    def _fits(
        self,
        line: Line,
        edits: Sequence[Edit],
        onward: Onward | None,
        far: float,
        where: str,
    ) -> Iterator[Fit]:
        share = shares(edits)
        own_value = line.places.values[0]
        own_half = line.places.halves[0]
        relative = own_half / abs(own_value) if own_value else 0.0
        wanted = self.claim.stands_for
        middle, room = wanted.middle, wanted.half
        loose = LOOSE * (relative + 1e-9) + (0.01 if relative else 0.0)
        done: dict[float, float | None] = {}
        for edit in edits:
            value = _first_look(line.places, edit)
            if value is None:
                continue
            if onward is not None:
                if value not in done:
                    done[value] = carried_or_none(onward.quick, value)
                value_there = done[value]
                if value_there is None:
                    continue
            else:
                value_there = value
            if abs(value_there - middle) > room + loose * abs(value_there):
                continue
            fit = self._worked(line, edit, onward)
            if fit is not None:
                weight = share[edit.family] * math.exp(-far)
                yield Fit(edit, fit[0], fit[1], weight, where)

    def _worked(self, line: Line, edit: Edit, onward: Onward | None) -> tuple[float, float] | None:
        """Return value and half width at the claim, if they meet what it stands for."""
        changed = dict.fromkeys(edit.at, (edit.value, edit.half))
        try:
            value, half = line.places.with_places(changed)
            if onward is not None:
                ends = [onward.exact(value - half), onward.exact(value + half)] if half else []
                value = onward.exact(value)
                half = max((abs(end - value) for end in ends), default=0.0) + self._rest(value)
        except FAILURES:
            return None
        meets = self.claim.stands_for.meets(Interval(value - half, value + half))
        return (value, half) if meets else None

    def _rest(self, value: float) -> float:
        """Return the half width that the claim's own other arguments bring."""
        own, half = self.pairs[self.claim.id]
        return abs(value) * half / abs(own) if own else half


def _first_look(places: Places, edit: Edit) -> float | None:
    try:
        return places.with_value(edit.at, edit.value)
    except FAILURES:
        return None
