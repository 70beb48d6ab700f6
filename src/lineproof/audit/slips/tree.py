"""A formula taken apart into its places, so that one place can be changed and the rest kept.

Each place keeps its value and half the width of what it stands for. A changed place is carried
up to the result by the same operations in the same order as :mod:`lineproof.formula.compiled`;
that costs a few microseconds, where compiling each edited formula would cost a hundred times more.
"""

from __future__ import annotations

import math
import operator
from collections.abc import Callable, Mapping, Sequence
from dataclasses import dataclass
from typing import Any

from lineproof.audit.graph import real
from lineproof.formula.compiled import FUNCTIONS
from lineproof.formula.tree import Binary, Call, Name, Negative, Number, Tree

Pair = tuple[float, float]
"""A value and half the width of what it stands for."""


OPERATIONS: Mapping[str, Callable[..., Any]] = {
    "+": operator.add, "-": operator.sub, "*": operator.mul, "/": operator.truediv,
    "**": operator.pow, "negative": operator.neg, **FUNCTIONS,
}  # fmt: skip
"""What the operations of a tree do with floats."""


@dataclass(frozen=True, slots=True)
class Place:
    """One node of a tree: its operation, the node above and the nodes below, by number."""

    tree: Tree
    operation: str
    above: int
    slot: int
    below: tuple[int, ...]


def _parts(tree: Tree) -> tuple[str, tuple[Tree, ...]]:
    match tree:
        case Negative(of):
            return "negative", (of,)
        case Binary(op, left, right):
            return op, (left, right)
        case Call(function, args):
            return function, args
    return "", ()


def places_of(tree: Tree) -> tuple[Place, ...]:
    """Return the places of a tree, each before those below it."""
    found: list[Place] = []

    def add(node: Tree, above: int, slot: int) -> int:
        at = len(found)
        operation, parts = _parts(node)
        found.append(Place(node, operation, above, slot, ()))
        below = tuple(add(part, at, order) for order, part in enumerate(parts))
        found[at] = Place(node, operation, above, slot, below)
        return at

    add(tree, -1, 0)
    return tuple(found)


def _half(operation: str, value: float, below: Sequence[Pair]) -> float:
    """Return the half width of a result to first order, the widths taken as if none cancelled."""
    (a, half_a), (b, half_b) = below[0], below[-1]
    match operation:
        case "+" | "-":
            half = half_a + half_b
        case "*":
            half = abs(a) * half_b + abs(b) * half_a
        case "/":
            half = (half_a + abs(value) * half_b) / abs(b)
        case "**":
            half = abs(b * value / a) * half_a if a else half_a
        case "sqrt":
            half = half_a / (2 * value) if value else math.sqrt(half_a)
        case "cbrt":
            half = half_a / (3 * value**2) if value else math.cbrt(half_a)
        case "min" | "max":
            half = next(half for other, half in below if other == value)
        case "negative" | "abs":
            half = half_a
        case _:
            half = math.radians(half_a) * (1 + value**2 if operation in ("tan", "cot") else 1)
    return half


class Places:
    """A formula at the values of its arguments: each place with its value and half width.

    Raises one of :data:`NOT_COMPUTED` where the formula has no value there.
    """

    def __init__(self, places: Sequence[Place], named: Mapping[str, Pair]) -> None:
        self.places = places
        self.named = named
        self._ways: dict[int, list[tuple[Callable[..., Any], int, list[float]]]] = {}
        self.values = [0.0] * len(places)
        self.halves = [0.0] * len(places)
        for at in range(len(places) - 1, -1, -1):
            self.values[at], self.halves[at] = self._at(at, self.values, self.halves, named)
        real(self.values[0])

    def _at(
        self, at: int, values: list[float], halves: list[float], named: Mapping[str, Pair]
    ) -> Pair:
        place = self.places[at]
        match place.tree:
            case Number(text):
                return float(text), 0.0
            case Name(name):
                return named[name]
        value = OPERATIONS[place.operation](*[values[k] for k in place.below])
        return value, _half(place.operation, value, [(values[k], halves[k]) for k in place.below])

    def uses(self, name: str) -> list[int]:
        """Return the places where a quantity stands."""
        return [at for at, place in enumerate(self.places) if place.tree == Name(name)]

    def with_place(self, at: int, value: float) -> float:
        """Return the result with another value at one place."""
        way = self._ways.get(at)
        if way is None:
            way = self._ways[at] = self._way_up(at)
        for work, slot, others in way:
            if slot == 0:
                value = work(value, *others)
            elif slot == 1:
                value = work(others[0], value)
            else:  # the order of the arguments of min and max does not matter
                value = work(*others, value)
        if value.__class__ is not float or value - value != 0.0:
            return real(value)
        return value

    def _way_up(self, at: int) -> list[tuple[Callable[..., Any], int, list[float]]]:
        """Return the operations from a place up to the result, each with its other arguments."""
        way = []
        while self.places[at].above >= 0:
            place = self.places[at]
            over = self.places[place.above]
            others = [self.values[k] for k in over.below if k != at]
            slot = place.slot if len(over.below) < 3 else 2 * bool(place.slot)  # noqa: PLR2004
            way.append((OPERATIONS[over.operation], slot, others))
            at = place.above
        return way

    def with_value(self, at: Sequence[int], value: float) -> float:
        """Return the result with the same other value at some places."""
        if len(at) == 1:
            return self.with_place(at[0], value)
        return self.with_values([(k, value) for k in at], self.over(tuple(at)))

    def with_values(self, changed: Sequence[tuple[int, float]], over: Sequence[int]) -> float:
        """Return the result with other values at some places; ``over`` are the places above."""
        values = list(self.values)
        for k, value in changed:
            values[k] = value
        for k in over:
            place = self.places[k]
            values[k] = OPERATIONS[place.operation](*[values[j] for j in place.below])
        return real(values[0])

    def over(self, at: tuple[int, ...]) -> list[int]:
        """Return the places above some places, the lowest first."""
        over = set()
        for start in at:
            k = self.places[start].above
            while k >= 0:
                over.add(k)
                k = self.places[k].above
        return sorted(over - set(at), reverse=True)

    def with_places(self, changed: Mapping[int, Pair]) -> Pair:
        """Return the result and its half width with other values at some places."""
        values, halves = list(self.values), list(self.halves)
        touched = set(changed)
        for at in range(len(self.places) - 1, -1, -1):
            if at in changed:
                values[at], halves[at] = changed[at]
            elif not touched.isdisjoint(self.places[at].below):
                values[at], halves[at] = self._at(at, values, halves, self.named)
                touched.add(at)
        return real(values[0]), halves[0]


def text_of(tree: Tree) -> str:
    """Return a tree as it is typed, with no more brackets than it needs.

    >>> text_of(Binary("*", Name("a"), Binary("+", Name("b"), Number("2"))))
    'a*(b + 2)'
    """
    match tree:
        case Number(text) | Name(text):
            return text
        case Negative(of):
            return f"-{_wrapped(of, 2)}"
        case Binary(op, left, right):
            rank = _RANK[op]
            wide = f" {op} " if op in "+-" else op
            return f"{_wrapped(left, rank)}{wide}{_wrapped(right, rank + 1)}"
        case Call(function, args):
            return f"{function}({', '.join(text_of(arg) for arg in args)})"


_RANK = {"+": 1, "-": 1, "*": 2, "/": 2, "**": 3}


def _wrapped(tree: Tree, rank: int) -> str:
    own = _RANK[tree.op] if isinstance(tree, Binary) else 2 if isinstance(tree, Negative) else 4
    return text_of(tree) if own >= rank else f"({text_of(tree)})"
