"""What follows from claimed numbers: every line as a middle and its dependence on their rounding.

A claimed number stands for an interval. What is worked from it is kept as a first-order form: its
middle, how far each claimed number moves it, and a rest for what is not straight. Two lines that
rest on the same claimed number so move together, and 620 - d with d = 569 stays within half a
millimetre however many lines lie between.
"""

from __future__ import annotations

import math
from collections.abc import Callable, Collection, Iterator, Mapping, Sequence
from dataclasses import dataclass, field

import lineproof.beams  # noqa: F401 - registers the procedures of found values
from lineproof.audit.data import Interval
from lineproof.audit.graph import Graph, Node, real
from lineproof.errors import UserError
from lineproof.formula import names_of
from lineproof.formula.compiled import COMPARE, NOT_COMPUTED, compile_tree
from lineproof.record.entry import DECISION, FOUND
from lineproof.record.procedures import recall, run

Function = Callable[..., float]
"""What working a formula raises; TypeError: a root of a negative number compared."""
_COARSE = 0.005
"""Half the last digit over the number, from which on it has fewer than three digits."""
_SAME = 1e-12
"""Relative difference that is nothing but the rounding of floats."""


@dataclass(frozen=True, slots=True)
class Form:
    """A value that rests on claimed numbers: middle + sum of parts x (-1 to 1) +- rest.

    ``parts`` holds by how much the half interval of each claimed number moves the value.
    """

    middle: float
    parts: Mapping[str, float] = field(default_factory=dict)
    rest: float = 0.0

    @property
    def half(self) -> float:
        """Half the width of what it may be."""
        return sum(map(abs, self.parts.values())) + self.rest

    @property
    def interval(self) -> Interval:
        """All that it may be."""
        half = self.half
        return Interval(self.middle - half, self.middle + half)

    @property
    def is_point(self) -> bool:
        """Tell whether no rounding moves it."""
        return not self.parts and not self.rest


def claimed_form(entry_id: str, interval: Interval) -> Form:
    """Return the form of a claimed number: its own interval, whatever it was worked from."""
    half = interval.half
    return Form(interval.middle, {entry_id: half} if half else {})


def carried_on(stands: Form, follows: Form) -> Form:
    """Return what is worked with below a claimed line, from what it stands for and what follows.

    The number as typed was carried on, or the one that it rounds. The "3" that follows from 1 + 2
    is 3 and not 2.5 to 3.5; the "3" of 2.96 lets no more pass than what lies between both, with
    the roundings on the way. With three digits and more it stands for what it stands for.

    >>> carried_on(Form(3.0, {"x": 0.5}), Form(3.0)).half
    0.0
    >>> round(carried_on(Form(3.0, {"x": 0.5}), Form(2.96)).half, 4)
    0.055
    """
    half, size = stands.half, abs(stands.middle)
    if len(stands.parts) != 1 or stands.rest or half <= 0:
        return stands
    off = abs(stands.middle - follows.middle)
    if follows.is_point and off <= _SAME * size:
        return follows
    if half <= _COARSE * size or off > half + follows.half:
        return stands
    (own,) = stands.parts
    return Form(stands.middle, {own: min(half, off + follows.half + _COARSE * size)})


def combined(function: Function, forms: Sequence[Form]) -> Form:
    """Return the form of a function of forms; raises what the function raises at the middle.

    Each argument is moved to both its ends for the slope, and what is not straight between them
    goes into the rest; the two extreme corners are worked as well, where min, max and products
    show themselves.

    >>> x = claimed_form("x", Interval(9.0, 11.0))
    >>> combined(lambda a, b: a - b, [x, x]).interval
    Interval(low=0.0, high=0.0)
    """
    middles = [form.middle for form in forms]
    middle = real(function(*middles))
    moved = [(at, form) for at, form in enumerate(forms) if not form.is_point]
    if not moved:
        return Form(middle)
    parts: dict[str, float] = {}
    rest, bend, slopes = 0.0, 0.0, []
    for at, form in moved:
        half = form.half
        up = _at(function, middles, at, middles[at] + half, middle)
        down = _at(function, middles, at, middles[at] - half, middle)
        slope = (up - down) / (2 * half) if half else 0.0
        bent = (up + down - 2 * middle) / 4  # from nothing at the middle to twice this at the ends
        bend += bent
        rest += abs(slope) * form.rest + abs(bent)
        slopes.append(slope)
        for source, part in form.parts.items():
            parts[source] = parts.get(source, 0.0) + slope * part
    made = Form(middle + bend, _trimmed(parts, middle), rest)
    return _with_corners(function, middles, moved, slopes, made)


def _trimmed(parts: dict[str, float], middle: float) -> dict[str, float]:
    """Leave out what cancels to the rounding of floats."""
    least = _SAME * abs(middle)
    return {source: part for source, part in parts.items() if abs(part) > least}


def _at(
    function: Function, middles: Sequence[float], at: int, value: float, otherwise: float
) -> float:
    moved = list(middles)
    moved[at] = value
    return _tried(function, moved, otherwise)


def _tried(function: Function, values: Sequence[float], otherwise: float) -> float:
    """Return a function's value; where there is none, as at the root of a negative number, other's.

    The end of an interval may lie outside of what a formula takes although the middle does not.
    """
    try:
        return real(function(*values))
    except NOT_COMPUTED:
        return otherwise


def _with_corners(
    function: Function,
    middles: Sequence[float],
    moved: Sequence[tuple[int, Form]],
    slopes: Sequence[float],
    made: Form,
) -> Form:
    """Widen the rest where the function goes beyond it at the corner of all claimed numbers."""
    if len(moved) == 1:
        return made  # both its ends have been worked
    beyond, half = 0.0, made.half
    for way in (1.0, -1.0):
        corner = list(middles)
        for (at, form), slope in zip(moved, slopes, strict=True):
            step = sum(math.copysign(p, p * made.parts.get(i, 1.0)) for i, p in form.parts.items())
            corner[at] += way * (step + math.copysign(form.rest, slope))
        beyond = max(beyond, abs(_tried(function, corner, made.middle) - made.middle) - half)
    return Form(made.middle, made.parts, made.rest + beyond) if beyond > 0 else made


@dataclass(frozen=True, slots=True)
class World:
    """A record worked from certain values.

    ``stands`` are the forms that were put in place of lines' own, and ``used`` the form that each
    line lends to the lines below: a claimed one as it was claimed, :func:`carried_on`;
    ``follows`` is what a computed line is by its own formula; ``failed`` says why a line could not
    be worked; ``turned`` are the decisions that go the other way.
    """

    stands: Mapping[str, Form]
    used: Mapping[str, Form]
    follows: Mapping[str, Form]
    failed: Mapping[str, str]
    turned: frozenset[str]


class Worker:
    """The compiled functions of a graph, and worlds worked with them."""

    def __init__(self, graph: Graph) -> None:
        self.graph = graph
        self._functions: dict[str, tuple[Function, tuple[str, ...]]] = {}

    def world(
        self,
        stands: Mapping[str, Form],
        needed: Collection[str] | None = None,
        base: World | None = None,
    ) -> World:
        """Work the record with the forms of ``stands`` in place of their lines' own.

        ``needed`` limits found values, which take the longest, to those that something rests on;
        the others keep what is recorded. ``base`` is a world from which this one differs only in
        ``stands``: what does not rest on a difference is taken over.
        """
        used: dict[str, Form] = {} if base is None else dict(base.used)
        follows: dict[str, Form] = {} if base is None else dict(base.follows)
        failed: dict[str, str] = {} if base is None else dict(base.failed)
        turned: set[str] = set() if base is None else set(base.turned)
        for node in self._again(stands, base):
            if not node.has_value:
                turned.discard(node.id)
                if node.kind == DECISION and self._turns(node, used):
                    turned.add(node.id)
                continue
            if node.is_computed:
                failed.pop(node.id, None)
                follows[node.id] = self._worked(node, used, needed, failed)
                stood = stands.get(node.id)
                made = follows[node.id]
                used[node.id] = made if stood is None else carried_on(stood, made)
            else:
                used[node.id] = stands.get(node.id) or Form(self.graph.stored[node.id])
        return World(dict(stands), used, follows, failed, frozenset(turned))

    def _again(self, stands: Mapping[str, Form], base: World | None) -> Iterator[Node]:
        if base is None:
            yield from self.graph
            return
        other = [i for i, form in stands.items() if base.stands.get(i) != form]
        below = set(self.graph.below(other)) | set(other)
        yield from (node for node in self.graph if node.id in below)

    def _worked(
        self,
        node: Node,
        used: Mapping[str, Form],
        needed: Collection[str] | None,
        failed: dict[str, str],
    ) -> Form:
        recorded = Form(self.graph.stored[node.id])
        skip = node.kind == FOUND and needed is not None and node.id not in needed
        if skip or self._untouched(node, used):
            return recorded
        try:
            return self.form(node, used)
        except (*NOT_COMPUTED, UserError) as error:
            failed[node.id] = str(error)
            return recorded

    def _untouched(self, node: Node, used: Mapping[str, Form]) -> bool:
        stored = self.graph.stored
        for target in node.args.values():
            form = used[target]
            if form.parts or form.rest or form.middle != stored[target]:
                return False
        return True

    def form(self, node: Node, used: Mapping[str, Form]) -> Form:
        """Return what a line is by its own formula; raises where it cannot be worked."""
        function, names = self.function(node)
        return combined(function, [used[node.args[name]] for name in names])

    def function(self, node: Node) -> tuple[Function, tuple[str, ...]]:
        """Return a line's formula as a function, and the names of its arguments in order."""
        made = self._functions.get(node.id)
        if made is None:
            made = self._functions[node.id] = _function(node)
        return made

    def _turns(self, node: Node, used: Mapping[str, Form]) -> bool:
        if node.sides is None or self._untouched(node, used):
            return False
        values = {name: used[target].middle for name, target in node.args.items()}
        try:
            truth = node.compared(values)
        except NOT_COMPUTED:
            return True
        recorded = self.graph.truth(node.id)
        sign = node.sides[1]
        return COMPARE[sign](truth.left, truth.right) != recorded.holds


def _function(node: Node) -> tuple[Function, tuple[str, ...]]:
    if node.tree is not None:
        names = names_of(node.tree)
        return compile_tree(node.tree, names), names
    names = tuple(node.args)
    settings = node.entry["settings"]
    made = recall(node.entry["procedure"]["name"], node.entry["procedure"]["version"])
    if made is None:
        raise UserError(f"{node.id}: procedure {node.entry['procedure']['name']!r} is not known")
    known: dict[tuple[float, ...], float] = {}

    def found(*values: float) -> float:
        if values not in known:
            known[values] = run(made, dict(zip(names, values, strict=True)), settings)
        return known[values]

    return found, names
