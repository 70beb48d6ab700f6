"""The slip finder: which single slip reproduces a claimed value within its digits."""

from __future__ import annotations

import math
from collections.abc import Callable, Iterator, Mapping, Sequence
from dataclasses import dataclass, field
from types import MappingProxyType

from lineproof.audit.data import Claim, Interval, Slip
from lineproof.audit.graph import Graph, Node
from lineproof.audit.slips.against import Witnesses
from lineproof.audit.slips.bindings import edits_of_arguments, edits_of_bindings
from lineproof.audit.slips.carry import Carrier, Onward, fitting, may_reach, reach_of
from lineproof.audit.slips.edits import TOP, Edit, Line, edits_of, words_of
from lineproof.audit.slips.kinds import FAMILIES
from lineproof.audit.slips.numbers import edits_of_numbers
from lineproof.audit.slips.rank import Fit, likely, ranked, shares
from lineproof.audit.slips.scope import Pairs, Scope, scope_of
from lineproof.audit.slips.tree import Pair, Places
from lineproof.audit.slips.values import others_for
from lineproof.audit.slips.whole import edits_of_copy, edits_of_result
from lineproof.formula.compiled import NOT_COMPUTED

FARTHER = 0.1
"""By so much (natural logarithm) a slip is less likely for each line it lies further up."""
LOOSE, ROUNDED = 1.5, 0.006
"""At first fits are sought so many widths wide, and for the width that another value of three
digits brings; then the width of each is worked out."""
Find = Callable[[Graph, str, Mapping[str, Interval], Claim, Mapping[str, str]], tuple[Slip, ...]]
"""What :func:`find_slips` is: graph, line, values used, claim, numbers claimed; gives the slips."""
NOTHING: Mapping[str, str] = MappingProxyType({})
"""No number of a table: each line is searched up to the inputs."""
WHEREVER = ", wherever it is used"
"""What is said of a value above the claim, in words that follow those of the slip."""
CONTRADICTED = 0.05
"""So much less likely is a slip above a claim that another claimed line would show."""
ASKED = 24
"""So many of the likeliest slips above a claim are held against the other claimed lines."""
MOST_KEPT = 400
"""Edits of so many lines are kept while one table of claims is searched."""


def find_slips(
    graph: Graph,
    entry_id: str,
    used: Mapping[str, Interval],
    claim: Claim,
    claimed: Mapping[str, str] = NOTHING,
) -> tuple[Slip, ...]:
    """Return the single slips that reproduce a claim, the most plausible first, eight at most.

    ``used`` gives for every value of the graph what follows from the values that the claim itself
    uses, in internal units; a value not in it is taken as recorded. ``claimed`` holds the numbers
    of the table by id, as typed: the slip is sought in the claimed line and in the lines between it
    and those above, and a digit misread is one of a number as it was typed. An empty tuple says
    that no single slip known here fits. For many claims of one table, :func:`searching` is
    quicker.
    """
    return SlipSearch(graph, used, claimed).slips(entry_id, claim)


def searching() -> Find:
    """Return a :func:`find_slips` that keeps what it has worked out while graph and values stay.

    The mappings ``used`` and ``claimed`` must not be changed between two calls.
    """
    kept: list[SlipSearch] = []

    def find(
        graph: Graph,
        entry_id: str,
        used: Mapping[str, Interval],
        claim: Claim,
        claimed: Mapping[str, str] = NOTHING,
    ) -> tuple[Slip, ...]:
        asked = graph, used, claimed
        if not kept or any(a is not b for a, b in zip(kept[0].asked, asked, strict=True)):
            kept[:] = [SlipSearch(*asked)]
        return kept[0].slips(entry_id, claim)

    return find


def none_fits(graph: Graph, entry_id: str) -> str:
    """Return the sentence for a claim that no single slip reproduces."""
    return f"No single slip reproduces the value claimed for {words_of(scope_of(graph), entry_id)}."


@dataclass(frozen=True, slots=True)
class Tried:
    """The edits of a line with what each makes of the line, in the order of these values.

    ``wide`` are those whose value moves far within the digits of an argument: each is worked out.
    """

    line: Line
    edits: Sequence[Edit]
    values: Sequence[float]
    share: Mapping[str, float]
    wide: Sequence[int]


@dataclass(frozen=True, slots=True)
class Target:
    """What a claim stands for, and how wide the claim's own arguments make its value."""

    claim: Claim
    relative: float
    half: float

    @property
    def room(self) -> tuple[float, float]:
        """Between these values fits are sought at first."""
        wanted = self.claim.stands_for
        size = max(abs(wanted.low), abs(wanted.high))
        room = (LOOSE * self.relative + ROUNDED) * size
        return wanted.low - room, wanted.high + room


@dataclass(frozen=True)
class SlipSearch:
    """Finds the slips behind the claims of one table, made with the values ``used``.

    ``claimed`` are its numbers by id, as typed. Lines worked out for one claim are kept for the
    next.
    """

    graph: Graph
    used: Mapping[str, Interval]
    claimed: Mapping[str, str]
    _pairs: Pairs = field(init=False, repr=False)
    _scope: Scope = field(init=False, repr=False)
    _carrier: Carrier = field(init=False, repr=False)
    _witnesses: Witnesses = field(init=False, repr=False)
    _lines: dict[str, Line | None] = field(default_factory=dict, init=False, repr=False)
    _above: dict[str, Tried | None] = field(default_factory=dict, init=False, repr=False)

    def __post_init__(self) -> None:
        object.__setattr__(self, "_pairs", Pairs(self.graph, self.used, self.claimed))
        object.__setattr__(self, "_scope", scope_of(self.graph))
        carrier = Carrier(self._scope, self._pairs, self._line)
        object.__setattr__(self, "_carrier", carrier)
        witnesses = Witnesses(self._scope, self._pairs, self.used, self.claimed)
        object.__setattr__(self, "_witnesses", witnesses)

    @property
    def asked(self) -> tuple[Graph, Mapping[str, Interval], Mapping[str, str]]:
        """What it was made for."""
        return self.graph, self.used, self.claimed

    def slips(self, entry_id: str, claim: Claim) -> tuple[Slip, ...]:
        """Return the single slips that reproduce a claim, as :func:`find_slips` does."""
        line = _claimed_line(self._scope, self._pairs, entry_id)
        if line is None:
            return ()
        value, half = line.pair(0)
        target = Target(claim, half / abs(value) if value else 0.0, half)
        fits = list(_fits(_own(line, claim), target, None, 1.0, ""))
        reach = reach_of(self._scope, entry_id, self.claimed)
        for above, distance in (*reach.lines.items(), *reach.leaves.items()):
            onward = self._carrier.onward(reach, above)
            if onward is None or not may_reach(onward, self._pairs[above][0], *target.room):
                continue
            tried = self._tried(above)
            if tried is None:
                continue
            where = WHEREVER
            if above in reach.lines:
                where = f", in {words_of(self._scope, above)}, which carries on to the claim"
            fits += _fits(tried, target, onward, math.exp(-FARTHER * distance), where)
        return ranked(self._weighed(fits, entry_id, claim), claim)

    def _weighed(self, fits: Sequence[Fit], entry_id: str, claim: Claim) -> list[Fit]:
        """Return the fits, the likeliest of those above the claim held against other claims.

        What made the line above wrong would show in every claimed line that rests on it, unless
        it was worked anew for this claim alone: such a slip is less likely, and is told so.
        """
        order = sorted(range(len(fits)), key=lambda at: -likely(fits[at], claim))
        weighed = list(fits)
        asked = 0
        for at in order:
            fit = fits[at]
            if not fit.above:
                continue
            if asked == ASKED:
                break
            asked += 1
            witness = self._witnesses.against(entry_id, fit.above, fit.own)
            if witness:
                name = words_of(self._scope, witness)
                where = f"{fit.where}, though {name} rests on it as well and is right"
                share = fit.share * CONTRADICTED
                weighed[at] = fit._replace(share=share, where=where, against=witness)
        return weighed

    def _line(self, entry_id: str) -> Line | None:
        if entry_id not in self._lines:
            self._lines[entry_id] = _line_above(self._scope, self._pairs, entry_id)
        return self._lines[entry_id]

    def _tried(self, entry_id: str) -> Tried | None:
        if entry_id not in self._above:
            if len(self._above) > MOST_KEPT:
                self._above.clear()
            line = self._line(entry_id)
            self._above[entry_id] = None if line is None else _above(line)
        return self._above[entry_id]


def _claimed_line(scope: Scope, pairs: Pairs, entry_id: str) -> Line | None:
    """Return a claimed line at the value that follows for it, whatever is claimed."""
    node = scope.graph[entry_id]
    own = pairs.copied()
    try:
        if node.tree is not None:
            places = _places(scope, pairs, node)
            own[entry_id] = places.values[0], places.halves[0]
            return Line(scope, node, places, own)
        if node.is_computed:
            own[entry_id] = _found(node, pairs)
        else:
            own[entry_id] = scope.graph.stored[entry_id], 0.0
        return Line(scope, node, _places(scope, own, node), own)
    except NOT_COMPUTED:
        return None


def _found(node: Node, pairs: Pairs) -> Pair:
    """Return a found value and half its width, from one run more for each uncertain argument."""
    named = {name: pairs[target] for name, target in node.args.items()}
    middle = {name: value for name, (value, _) in named.items()}
    value = node.compute(middle)
    moved = [
        abs(node.compute(middle | {name: at + half}) - value)
        for name, (at, half) in named.items()
        if half
    ]
    return value, sum(moved)


def _places(scope: Scope, pairs: Pairs, node: Node) -> Places:
    named = {name: pairs[target] for name, target in node.args.items() if target in scope.units}
    if node.tree is None:
        named = {node.symbol: pairs[node.id]}
    return Places(scope.places(node), named)


def _line_above(scope: Scope, pairs: Pairs, entry_id: str) -> Line | None:
    node = scope.graph[entry_id]
    try:
        return Line(scope, node, _places(scope, pairs, node), pairs, above=True)
    except NOT_COMPUTED:
        return None


def _own(line: Line, claim: Claim) -> Tried:
    """Return the edits of the claimed line itself."""
    edits = [*_inside(line), *edits_of_result(line), *edits_of_copy(line, claim)]
    return _tried(line, edits)


def _inside(line: Line) -> list[Edit]:
    """Return the edits of a line's formula and arguments; a given has none.

    The arguments of a found value are tried in the claimed line only: each costs a run.
    """
    if line.node.tree is not None:
        return [*edits_of(line), *edits_of_numbers(line), *edits_of_bindings(line)]
    return list(edits_of_arguments(line)) if line.node.is_computed and not line.above else []


def _above(line: Line) -> Tried:
    """Return the edits of an unclaimed line, a given or a looked-up value above a claim."""
    if line.node.is_computed:
        edits = [*_inside(line), *edits_of_result(line)]
    else:
        edits = [other.edit(TOP, line.node.id) for other in others_for(line, line.node.id)]
    return _tried(line, edits)


def _tried(line: Line, edits: Sequence[Edit]) -> Tried:
    worked = []
    for edit in edits:
        try:
            worked.append((line.places.with_value(edit.at, edit.value), edit))
        except NOT_COMPUTED:
            continue
    worked.sort(key=lambda pair: pair[0])
    ordered = [edit for _, edit in worked]
    wide = [at for at, edit in enumerate(ordered) if FAMILIES[edit.family].wide]
    return Tried(line, ordered, [value for value, _ in worked], shares(edits), wide)


def _fits(
    tried: Tried, target: Target, onward: Onward | None, nearness: float, where: str
) -> Iterator[Fit]:
    low, high = target.room
    if onward is None:
        found = [at for at, value in enumerate(tried.values) if low <= value <= high]
    else:
        found = fitting(onward.quick, tried.values, low, high) if tried.values else []
    for at in dict.fromkeys((*found, *tried.wide)):
        edit = tried.edits[at]
        if onward is not None and edit.value == target.claim.value:
            continue  # the claim itself, or what only repeats it, explains nothing above it
        made = _worked(tried.line, edit, target, onward)
        if made is not None:
            value, half, own = made
            above = "" if onward is None else tried.line.node.id
            share = tried.share[edit.family] * nearness
            yield Fit(edit, value, half, share, where, above, own)


def _worked(
    line: Line, edit: Edit, target: Target, onward: Onward | None
) -> tuple[float, float, float] | None:
    """Return value and half width at the claim, if they meet what it stands for, and the line's."""
    try:
        value, half = line.places.with_places(dict.fromkeys(edit.at, (edit.value, edit.half)))
        own = value
        if onward is not None:
            spread = onward.quick(value + half) - onward.quick(value) if half else 0.0
            value, half = onward.exact(value), abs(spread) + target.half
    except NOT_COMPUTED:
        return None
    meets = target.claim.stands_for.meets(Interval(value - half, value + half))
    return (value, half, own) if meets else None
