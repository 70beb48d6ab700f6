"""A record as a graph that can be worked again with other values: what rests on what."""

from __future__ import annotations

import math
from collections.abc import Iterable, Iterator, Mapping
from dataclasses import dataclass
from functools import cached_property
from typing import Any

from lineproof.errors import UserError
from lineproof.formula import Tree, parse_criterion, parse_line
from lineproof.formula.compiled import COMPARE, weave_tree
from lineproof.quantity.digits import rounded_text
from lineproof.quantity.units import internal_factor
from lineproof.record import Record
from lineproof.record.entry import CHECK, CRITERIA, FOUND, LINE, VALUES
from lineproof.record.printing import ratio
from lineproof.record.procedures import recall, run

NO_VALUE = "no value"
"""What is said of a value that is no finite number."""
Number = float
"""A value in internal units: N, mm, MPa and what follows from them; angles in degrees."""


@dataclass(frozen=True, slots=True)
class Node:
    """One line of a record that has a value or a truth.

    ``args`` are the ids that the line rests on by the names in its formula; ``tree`` is the
    formula of a line, ``sides`` are both sides of a criterion and its comparison.
    """

    id: str
    part: str
    kind: str
    entry: Mapping[str, Any]
    args: Mapping[str, str]
    tree: Tree | None = None
    sides: tuple[Tree, str, Tree] | None = None

    @property
    def symbol(self) -> str:
        """The symbol, as its formula names it."""
        return str(self.entry["symbol"])

    @property
    def unit(self) -> str:
        """The unit in which it prints."""
        return str(self.entry["unit"])

    @property
    def title(self) -> str:
        """What it is, in words."""
        return str(self.entry["title"])

    @property
    def label(self) -> str:
        """Its number on the page."""
        return str(self.entry["label"])

    @property
    def stored(self) -> Number:
        """The recorded value."""
        return float(self.entry["value"]) * internal_factor(self.unit)

    @property
    def has_value(self) -> bool:
        """Tell whether it is a quantity; decisions and checks have a truth instead."""
        return self.kind in VALUES

    @property
    def is_computed(self) -> bool:
        """Tell whether it follows from other lines."""
        return self.kind in (LINE, FOUND)

    def number_text(self, value: Number, digits: int = 4) -> str:
        """Return a value of the line as a number in its printed unit, rounded to some digits.

        An input is exact: 4 bars and 380 mm, not 4.000 bars and 380.0 mm. What absurd claims lead
        to is no number.
        """
        if not math.isfinite(value):
            return NO_VALUE
        text = rounded_text(value / internal_factor(self.unit), digits)
        exact = not self.is_computed and "." in text and "e" not in text.lower()
        return text.rstrip("0").rstrip(".") if exact else text

    def compute(self, named: Mapping[str, Number]) -> Number:
        """Return its value from the values of its arguments, by the names in its formula.

        Raises :class:`ArithmeticError` or :class:`ValueError` where there is none.
        """
        if self.tree is not None:
            return evaluated(self.tree, named)
        procedure = self.entry["procedure"]
        made = recall(procedure["name"], procedure["version"])
        if made is None:
            raise UserError(f"{self.id}: procedure {procedure['name']!r} is not known here")
        return run(made, named, self.entry["settings"])

    def compared(self, named: Mapping[str, Number]) -> Truth:
        """Return both sides of a criterion, whether it holds, and its utilisation."""
        if self.sides is None:
            msg = f"{self.id} compares nothing"
            raise TypeError(msg)
        left_tree, sign, right_tree = self.sides
        left, right = evaluated(left_tree, named), evaluated(right_tree, named)
        return Truth(left, right, COMPARE[sign](left, right), ratio(sign, left, right))


@dataclass(frozen=True, slots=True)
class Truth:
    """A criterion worked out: its sides, whether it holds, and its utilisation where it has one."""

    left: Number
    right: Number
    holds: bool
    utilisation: float | None


@dataclass(frozen=True, slots=True)
class Worked:
    """A record worked again: values and truths by id, and the ids that could not be worked."""

    values: Mapping[str, Number]
    truths: Mapping[str, Truth]
    failed: Mapping[str, str]


def real(value: object) -> float:
    """Return a value if it is a finite real number, else raise :class:`ValueError`."""
    if not isinstance(value, float) or not math.isfinite(value):
        msg = "no finite real number"
        raise ValueError(msg)
    return value


def evaluated(tree: Tree, named: Mapping[str, Number]) -> Number:
    """Return the value of a tree; raises for anything but a finite real number.

    >>> evaluated(parse_line("a = 2*b")[1], {"b": 3.0})
    6.0
    """
    return real(weave_tree(tree)(named))


class Graph:
    """The lines of a record with values or truths, in the order of the record."""

    def __init__(self, record: Record) -> None:
        self.record = record
        self.nodes: dict[str, Node] = {
            entry["id"]: _node(part["key"], entry)
            for part in record.parts
            for entry in part["entries"]
            if entry["kind"] in VALUES or entry["kind"] in CRITERIA
        }

    def __getitem__(self, entry_id: str) -> Node:
        return self.nodes[entry_id]

    def __iter__(self) -> Iterator[Node]:
        return iter(self.nodes.values())

    @cached_property
    def stored(self) -> dict[str, Number]:
        """The recorded values by id, in internal units."""
        return {node.id: node.stored for node in self if node.has_value}

    @cached_property
    def users(self) -> dict[str, tuple[str, ...]]:
        """The ids that rest on an id at once, in the order of the record."""
        found: dict[str, list[str]] = {entry_id: [] for entry_id in self.nodes}
        for node in self:
            for target in dict.fromkeys(node.args.values()):
                if target in found:
                    found[target].append(node.id)
        return {entry_id: tuple(ids) for entry_id, ids in found.items()}

    @cached_property
    def sources(self) -> dict[str, tuple[str, ...]]:
        """The ids that an id rests on at once."""
        return {node.id: tuple(dict.fromkeys(node.args.values())) for node in self}

    def below(self, ids: Iterable[str]) -> list[str]:
        """Return every id that rests on some of these, themselves left out, in order."""
        return self._reached(ids, self.users)

    def above(self, ids: Iterable[str]) -> list[str]:
        """Return every id that these rest on, themselves left out, in order."""
        return self._reached(ids, self.sources)

    def _reached(self, ids: Iterable[str], ways: Mapping[str, Iterable[str]]) -> list[str]:
        start = set(ids)
        waiting, reached = list(start), set()
        while waiting:
            for target in ways.get(waiting.pop(), ()):
                if target not in reached:
                    reached.add(target)
                    waiting.append(target)
        reached -= start
        return [entry_id for entry_id in self.nodes if entry_id in reached]

    def named(self, node: Node, values: Mapping[str, Number]) -> dict[str, Number]:
        """Return the values of a line's arguments by the names in its formula."""
        return {name: values[target] for name, target in node.args.items()}

    def worked(self, changed: Mapping[str, Number]) -> Worked:
        """Work again all that rests on changed values; the changed ones stay as they are given.

        A line that cannot be worked keeps its recorded value and is told in ``failed``.
        """
        values, truths, failed = dict(self.stored) | dict(changed), {}, {}
        for entry_id in self.below(changed):
            if entry_id in changed:
                continue
            node = self.nodes[entry_id]
            try:
                named = self.named(node, values)
                if node.has_value:
                    values[entry_id] = node.compute(named)
                else:
                    truths[entry_id] = node.compared(named)
            except (ArithmeticError, ValueError) as error:
                failed[entry_id] = str(error)
        return Worked(values, truths, failed)

    def truth(self, entry_id: str) -> Truth:
        """Return a criterion worked out from the recorded values."""
        node = self.nodes[entry_id]
        return node.compared(self.named(node, self.stored))

    def checks(self) -> Iterator[Node]:
        """Give the checks in order."""
        return (node for node in self if node.kind == CHECK)


def _node(part: str, entry: Mapping[str, Any]) -> Node:
    args = dict(entry.get("args", {}))
    kind = entry["kind"]
    tree = parse_line(entry["formula"])[1] if kind == LINE else None
    sides = parse_criterion(entry["formula"]) if kind in CRITERIA else None
    return Node(entry["id"], part, kind, entry, args, tree, sides)
