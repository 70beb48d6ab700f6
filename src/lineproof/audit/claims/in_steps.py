"""A line worked in steps of which each is written down: rounding inside of it, by its own digits.

By hand T = 0.85 x 1500 x 400 = 510 kN stands on the paper before M_r = 510 (d - a/2) does, and
sqrt(f'c) = 5.66 before what it is put into. None of these is a line of the calc. Every usual way to
part a line gives one value, as for the lines on the way, and no band: no more than such a value is
let pass.
"""

from __future__ import annotations

import math
from collections.abc import Collection, Iterator, Mapping, Sequence
from decimal import Decimal
from typing import NamedTuple

from lineproof.audit.claims.propagate import Worker, World
from lineproof.audit.data import LEAST_DIGITS, Claim, Interval
from lineproof.audit.graph import Node, evaluated
from lineproof.formula.compiled import NOT_COMPUTED
from lineproof.formula.tree import Binary, Call, Name, Negative, Number, Tree
from lineproof.quantity.digits import significant
from lineproof.quantity.units import UNITS

STEPS = "follows where the steps of the line are rounded to"
"""How the note begins of a line that agrees so."""
_CHOSEN = ("min", "max", "abs")
"""Functions that give one of their arguments: nothing new is written down."""
_SUM = ("+", "-")
_OF_MATERIALS = ("stress or pressure", "number")

Named = Mapping[str, float]


class _Way(NamedTuple):
    """How a line is parted: roots and brackets always; terms of sums, products into which groups.

    ``product`` is "" for a product worked in one go, ``fraction`` for what stands above the bar and
    below it, ``force`` for the plain factors beside a bracket, ``stress`` for all of the materials.
    """

    terms: bool
    product: str


_WAYS = (
    _Way(terms=False, product=""), _Way(terms=True, product=""),
    _Way(terms=True, product="fraction"), _Way(terms=True, product="force"),
    _Way(terms=True, product="stress"),
)  # fmt: skip


def in_steps(
    worker: Worker, world: World, node: Node, claim: Claim, claimed: Collection[str]
) -> tuple[Interval, int] | None:
    """Return what a line is by the first way that a claim meets, with the digits of its steps.

    They have the digits of the claim, or one more. Nothing where it rests on a line that nobody
    ``claimed``: how that one was rounded is not known, and both together would give most numbers.
    """
    if node.tree is None or any(_is_open(worker, t, claimed) for t in node.args.values()):
        return None
    named = {name: world.used[target].middle for name, target in node.args.items()}
    of_materials = frozenset(n for n, t in node.args.items() if _is_of_materials(worker, t))
    follows = world.follows[node.id].interval
    digits = max(_digits(claim), LEAST_DIGITS)
    for shown in (digits, digits + 1):
        for off in _offsets(node.tree, named, of_materials, shown):
            interval = Interval(follows.low + off, follows.high + off)
            if claim.stands_for.meets(interval):
                return interval, shown
    return None


def _is_open(worker: Worker, target: str, claimed: Collection[str]) -> bool:
    """Tell whether a value is one that nobody claimed, other than the copy of an input."""
    node = worker.graph[target]
    if isinstance(node.tree, Name):
        return _is_open(worker, node.args[node.tree.id], claimed) and target not in claimed
    return node.is_computed and target not in claimed


def _digits(claim: Claim) -> int:
    """Return how many digits a claim shows."""
    half = claim.stands_for.half
    if not claim.value or not half:
        return LEAST_DIGITS
    return math.floor(math.log10(abs(claim.value))) - math.floor(math.log10(2 * half * 1.001)) + 1


def _is_of_materials(worker: Worker, target: str) -> bool:
    return UNITS[worker.graph[target].unit].kind in _OF_MATERIALS


def _offsets(
    tree: Tree, named: Named, of_materials: frozenset[str], digits: int
) -> Iterator[float]:
    """Give by how much each way moves the value of a line."""
    try:
        exact = evaluated(tree, named)
    except NOT_COMPUTED:
        return
    for way in _WAYS:
        try:
            yield _Parted(named, of_materials, way, digits).whole(tree) - exact
        except NOT_COMPUTED:
            continue


class _Parted:
    """A line worked in steps by one way."""

    def __init__(self, named: Named, of_materials: frozenset[str], way: _Way, digits: int) -> None:
        self.named, self.of_materials, self.way, self.digits = named, of_materials, way, digits

    def whole(self, tree: Tree) -> float:
        """Return the value of a line, its last step as it is."""
        match tree:
            case Number(text):
                value = float(Decimal(text))
            case Name(name):
                value = self.named[name]
            case Negative(of):
                value = -self.whole(of)
            case Binary(op, left, right) if op in _SUM:
                second = self._term(right)
                value = self._term(left) + (second if op == "+" else -second)
            case Binary("**", left, right):
                value = evaluated(_POWER, {"a": self._step(left), "b": self.whole(right)})
            case Binary():
                value = self._product(tuple(_factors(tree)))
            case Call(function, args):
                values = {f"a{n}": self.whole(arg) for n, arg in enumerate(args)}
                value = evaluated(Call(function, tuple(map(Name, values))), values)
        return value

    def _step(self, tree: Tree) -> float:
        """Return a part of a line as it is written down, if it is a step of its own."""
        value = self.whole(tree)
        plain = isinstance(tree, Name | Number | Negative)
        chosen = isinstance(tree, Call) and tree.function in _CHOSEN
        return value if plain or chosen else self._written(value)

    def _term(self, tree: Tree) -> float:
        is_product = isinstance(tree, Binary) and tree.op not in _SUM
        return self._step(tree) if self.way.terms and is_product else self.whole(tree)

    def _product(self, factors: Sequence[tuple[Tree, int]]) -> float:
        groups: dict[object, list[float]] = {}
        for tree, way in factors:
            value = self._step(tree)
            groups.setdefault(self._group(tree, way), []).append(value if way > 0 else 1 / value)
        made = 1.0
        for group, values in groups.items():
            value = math.prod(values)
            parted = group is not None and len(values) > 1 and len(groups) > 1
            made *= self._grouped(value, group) if parted else value
        return made

    def _grouped(self, value: float, group: object) -> float:
        """Return a group as it is written down; what stands below the bar as its own number."""
        return 1 / self._written(1 / value) if group == "below" else self._written(value)

    def _group(self, tree: Tree, way: int) -> str | None:
        """Return the group of a product to which a factor belongs; None for none."""
        match self.way.product:
            case "fraction":
                return "above" if way > 0 else "below"
            case "force":
                plain = isinstance(tree, Name | Number)
                return ("above" if way > 0 else "below") if plain else None
            case "stress":
                names = {tree.id} if isinstance(tree, Name) else set()
                inner = isinstance(tree, Call | Number)
                return "stress" if inner or names & self.of_materials else None
        return None

    def _written(self, value: float) -> float:
        if not value:
            return value
        return math.copysign(float(significant(abs(value), self.digits)), value)


_POWER = Binary("**", Name("a"), Name("b"))


def _factors(tree: Tree, way: int = 1) -> Iterator[tuple[Tree, int]]:
    """Give the factors of a product, with 1, or -1 for those that divide."""
    match tree:
        case Binary("*", left, right):
            yield from _factors(left, way)
            yield from _factors(right, way)
        case Binary("/", left, right):
            yield from _factors(left, way)
            yield from _factors(right, -way)
        case _:
            yield tree, way
