"""What the rules on traps look at: a record's lines by what they stand for, and their places."""

from __future__ import annotations

import re
from collections.abc import Callable, Iterator, Mapping
from dataclasses import dataclass, field
from functools import cached_property
from typing import Any

from lineproof.audit.data import Severity
from lineproof.audit.effects import named_line
from lineproof.audit.graph import Graph, Node
from lineproof.audit.search.member import Member, member_of
from lineproof.formula import Tree, parse_line
from lineproof.formula.tree import Binary, Call, Name, Number, names_of, numbers_of, walk
from lineproof.record import Record
from lineproof.record.entry import CHECK, CRITERIA, GIVEN, LINE

_HOGGING = re.compile(
    r"over the support|support \d+, (left|right) face|negative|hogging|top bars|top steel",
    re.IGNORECASE,
)
_CLOSE = 1e-6


@dataclass(frozen=True, slots=True)
class Caught:
    """A line that a rule caught.

    ``what`` says it without naming the line; ``right`` holds values by id, in internal units, as
    they should be, from which the effects follow.
    """

    node: Node
    what: str
    advice: str
    severity: Severity = Severity.MAJOR
    clause: str = ""
    right: Mapping[str, float] = field(default_factory=dict)


@dataclass(frozen=True, slots=True)
class Remark:
    """What a rule found about the record as a whole, in a sentence without its full stop."""

    what: str
    advice: str
    severity: Severity = Severity.MAJOR
    clause: str = ""
    ids: tuple[str, ...] = ()


@dataclass(frozen=True, slots=True)
class Trap:
    """A rule: the number of its trap, its name, and what looks for it."""

    number: int
    name: str
    look: Callable[[View], Iterator[Caught | Remark]]


class View:
    """A record as the rules see it."""

    def __init__(self, record: Record) -> None:
        self.record = record
        self.graph = Graph(record)

    @cached_property
    def member(self) -> Member:
        """What kind of beam it is."""
        return member_of(self.record)

    @cached_property
    def is_one_member(self) -> bool:
        """Tell whether all its lines are of one member: a collection of cases may differ."""
        return bool(self.member.flow)

    @cached_property
    def titles(self) -> dict[str, str]:
        """The titles of the parts by key."""
        return {part["key"]: part["title"] for part in self.record.parts}

    @cached_property
    def _by_quantity(self) -> dict[str, list[Node]]:
        found: dict[str, list[Node]] = {}
        for node in self.graph:
            if node.has_value:
                found.setdefault(self.quantity(node), []).append(node)
        return found

    @cached_property
    def _by_part(self) -> dict[str, dict[str, Node]]:
        found: dict[str, dict[str, Node]] = {}
        for node in self.graph:
            found.setdefault(node.part, {})[node.symbol] = node
        return found

    def quantity(self, node: Node) -> str:
        """Return the symbol that a line's formula gives: a formula may be recorded under others."""
        return parse_line(node.entry["formula"])[0] if node.kind == LINE else node.symbol

    def values(self, *quantities: str) -> Iterator[Node]:
        """Give all values of these quantities, given ones too."""
        for quantity in quantities:
            yield from self._by_quantity.get(quantity, ())

    def lines(self, *quantities: str) -> Iterator[Node]:
        """Give the computed lines of these quantities."""
        return (node for node in self.values(*quantities) if node.tree is not None)

    def quantities(self, pattern: str) -> Iterator[Node]:
        """Give the computed lines whose quantity is like a pattern."""
        like = re.compile(pattern)
        for quantity in self._by_quantity:
            if like.fullmatch(quantity):
                yield from self.lines(quantity)

    def quantities_given(self, pattern: str) -> Iterator[Node]:
        """Give the typed values whose symbol is like a pattern."""
        like = re.compile(pattern)
        return (n for n in self.graph if n.kind == GIVEN and like.fullmatch(n.symbol))

    def criteria(self) -> Iterator[Node]:
        """Give checks and decisions."""
        return (node for node in self.graph if node.kind in CRITERIA)

    def checks(self) -> Iterator[Node]:
        """Give the checks."""
        return (node for node in self.graph if node.kind == CHECK)

    def part(self, key: str) -> Mapping[str, Node]:
        """Return the lines of a part by symbol; none if there is no such part."""
        return self._by_part.get(key, {})

    def target(self, node: Node, name: str) -> Node | None:
        """Return the line that a name in a formula stands for."""
        return self.graph.nodes.get(node.args.get(name, ""))

    def stored(self, node: Node | None) -> float | None:
        """Return the recorded value of a line."""
        return None if node is None else self.graph.stored.get(node.id)

    def near(self, node: Node, symbol: str) -> Node | None:
        """Return the line of a symbol that a line may mean: bound, in its part, or the only one."""
        found = self.target(node, symbol) or self.part(node.part).get(symbol)
        if found is None:
            others = list(self.values(symbol))
            found = others[0] if len({self.stored(other) for other in others}) == 1 else None
        return found

    def number(self, node: Node, symbol: str) -> float | None:
        """Return the value of :meth:`near`, in internal units."""
        return self.stored(self.near(node, symbol))

    def holds(self, node: Node) -> bool:
        """Tell whether a check or decision is recorded as holding."""
        return bool(node.entry["holds"])

    def compute(self, node: Node, **instead: float) -> float | None:
        """Return a line worked with other values for some of the names in its formula."""
        try:
            return node.compute(self.graph.named(node, self.graph.stored) | instead)
        except (ArithmeticError, ValueError, KeyError):
            return None

    def right(self, node: Node, value: float | None) -> dict[str, float]:
        """Return the right value of a line, as a finding wants it; none if it is not known."""
        return {} if value is None else {node.id: value}

    def over_support(self, node: Node) -> bool:
        """Tell whether a line stands where the top is in tension, by its part or its title."""
        return _HOGGING.search(f"{self.titles[node.part]} {node.title}") is not None

    def above(self, node: Node) -> list[Node]:
        """Return all lines that a line rests on."""
        return [self.graph[entry_id] for entry_id in self.graph.above([node.id])]

    def reaches_check(self, node: Node) -> bool:
        """Tell whether a check rests on a line."""
        return any(self.graph[i].kind == CHECK for i in self.graph.below([node.id]))

    def name(self, node: Node) -> str:
        """Name a line as a checker does."""
        return named_line(self.graph, node.id)

    def texts(self, symbol: str) -> Iterator[str]:
        """Give the texts of the notes of a symbol."""
        for entry in self.record.entries.values():
            if entry["kind"] == "note" and entry["symbol"] == symbol:
                yield str(entry["text"])

    def choice(self, what: str) -> str:
        """Return what the note of choices says, such as the use: the text after ``use: ``."""
        for text in self.texts("choices"):
            found = re.search(rf"\b{what}: ([^;.]+)", text)
            if found is not None:
                return found.group(1).strip()
        return ""

    def tables(self, symbol: str) -> Iterator[Mapping[str, Any]]:
        """Give the tables of a symbol."""
        for entry in self.record.entries.values():
            if entry["kind"] == "table" and entry["symbol"] == symbol:
                yield entry


def names(node: Node) -> frozenset[str]:
    """Return the names in a line's formula or in both sides of a criterion."""
    return frozenset(name for tree in trees(node) for name in names_of(tree))


def numbers(node: Node) -> frozenset[float]:
    """Return the constants in a line's formula or in both sides of a criterion."""
    return frozenset(float(text) for tree in trees(node) for text in numbers_of(tree))


def has(node: Node, *values: float) -> bool:
    """Tell whether one of these constants stands in a line's formula or a criterion."""
    return not numbers(node).isdisjoint(values)


def trees(node: Node) -> tuple[Tree, ...]:
    """Return the trees of a line: its formula, or both sides of a criterion."""
    if node.sides is not None:
        return node.sides[0], node.sides[2]
    return () if node.tree is None else (node.tree,)


def roots_of(node: Node) -> frozenset[str]:
    """Return the names that stand under a root, or to a power below one, in a line."""
    under: list[Tree] = []
    for tree in trees(node):
        for each in walk(tree):
            match each:
                case Call("sqrt", args):
                    under.extend(args)
                case Binary("**", base, Number(power)) if float(power) < 1:
                    under.append(base)
                case _:
                    pass
    return frozenset(name for tree in under for name in names_of(tree))


def terms(tree: Tree) -> list[Tree]:
    """Return what a largest or smallest value is taken of; the tree itself if it takes none.

    >>> len(terms(parse_line("b = min(l/10, 12*h_f)")[1]))
    2
    """
    if isinstance(tree, Call) and tree.function in ("min", "max"):
        return [term for arg in tree.args for term in terms(arg)]
    return [tree]


def is_name(tree: Tree, name: str) -> bool:
    """Tell whether a tree is one name alone."""
    return isinstance(tree, Name) and tree.id == name


def close(first: float, second: float, within: float = _CLOSE) -> bool:
    """Tell whether two values are the same but for a relative difference."""
    return abs(first - second) <= within * max(abs(first), abs(second))
