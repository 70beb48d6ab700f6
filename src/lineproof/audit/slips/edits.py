"""Slips that are edits of the formula: factors, terms, signs, powers, branches, brackets."""

from __future__ import annotations

import math
from collections.abc import Callable, Iterator
from dataclasses import dataclass
from functools import partial
from typing import NamedTuple

from lineproof.audit.graph import Node
from lineproof.audit.slips.scope import LOADS, Pairs, Scope
from lineproof.audit.slips.tree import OPERATIONS, Pair, Place, Places, text_of
from lineproof.formula.compiled import NOT_COMPUTED
from lineproof.formula.tree import Binary, Call, Name, Negative, Number, Tree
from lineproof.standards.nbc.combinations import FACTORS

TOP = (0,)
"""The place of the result."""
IN_METRES = {"mm": 1e3, "mm2": 1e6, "mm4": 1e12, "N": 1e3, "N.mm": 1e6, "MPa": 1e-3}
"""What one m, m2, m4, kN, kN.m and kPa are in internal units."""
SUM, PRODUCT = ("+", "-"), ("*", "/")
ANGULAR = ("sin", "cos", "tan", "cot")
NOTHING = 1e-3
"""Part of a term that is nothing beside it: what is left of kN.m once kN are divided by mm."""


class Edit(NamedTuple):
    """One slip: other values at some places of a formula, and how a checker would say it.

    ``far`` counts against it: by so much (natural logarithm) it is less likely than its family.
    ``swap`` are the ids of the value that is replaced and of the one that is taken for it, where
    the edit puts a value for another. ``published`` tells a value that another document prints.
    """

    family: str
    at: tuple[int, ...]
    value: float
    half: float
    words: Callable[[], str]
    far: float = 0.0
    swap: tuple[str, str] = ("", "")
    published: bool = False


@dataclass(frozen=True, slots=True)
class Line:
    """A line under search: its node, its formula at the values used, what stands around it.

    ``above`` tells that it lies above the claim: large families, which fit anything, are left out.
    """

    scope: Scope
    node: Node
    places: Places
    pairs: Pairs
    above: bool = False

    @property
    def is_load(self) -> bool:
        """Tell whether it is a load or what a load does."""
        return self.scope.units[self.node.id] in LOADS

    def is_load_factor(self, at: int) -> bool:
        """Tell whether a place is a load factor: 1.5*w_L is one, (gamma_c/2300)**1.5 none."""
        place = self.places.places[at]
        above = self.places.places[place.above].operation if place.above >= 0 else ""
        is_factor = isinstance(place.tree, Number) and place.tree.text in FACTORS
        return is_factor and self.is_load and above != "**"

    def pair(self, at: int) -> tuple[float, float]:
        """Return value and half width at a place."""
        return self.places.values[at], self.places.halves[at]

    def metre(self, tree: Tree) -> float:
        """Return how many internal units one of a quantity is where a hand works in kN and m.

        One for a line that is worked in N and mm. It matters where a slip breaks the units.
        """
        if not isinstance(tree, Name) or self.node.entry.get("system") != "kN-m":
            return 1.0
        return IN_METRES.get(self.scope.units.get(self.node.args.get(tree.id, ""), ""), 1.0)

    def named(self, name: str) -> str:
        """Return a quantity of the formula in words: its name, label and title."""
        target = self.node.args.get(name)
        return name if target is None else words_of(self.scope, target, name)

    def text(self, at: int) -> str:
        """Return a place in words."""
        tree = self.places.places[at].tree
        return self.named(tree.id) if isinstance(tree, Name) else text_of(tree)


def words_of(scope: Scope, entry_id: str, name: str = "") -> str:
    """Return a value in words: ``b_w (1.11, width of the web)``."""
    node = scope.graph[entry_id]
    symbol = scope.symbols[entry_id]
    inside = ", ".join(filter(None, (node.label, node.title)))
    own = "" if name in ("", symbol) else f"{symbol}, "
    return f"{name or symbol} ({own}{inside})"


def edits_of(line: Line) -> Iterator[Edit]:
    """Give every edit of a line's formula."""
    for at, place in enumerate(line.places.places):
        above = line.places.places[place.above].operation if place.above >= 0 else ""
        if place.operation in PRODUCT and above not in PRODUCT:
            yield from workable(_product(line, at))
        elif place.operation in SUM and above not in SUM:
            yield from _sum(line, at)
        match place.tree:
            case Binary("**"):
                yield from workable(_power(line, at, place))
            case Call():
                yield from workable(_call(line, at, place))
            case Negative():
                value, half = line.pair(place.below[0])
                yield Edit("sign", (at,), value, half, partial(_sign, line, place.below[0]), 0.0)


def workable(edits: Iterator[Edit]) -> Iterator[Edit]:
    """Give edits up to one that leaves the range of numbers or divides by nothing."""
    try:
        yield from edits
    except NOT_COMPUTED:
        return


def _chain(places: tuple[Place, ...], at: int, ways: tuple[str, str]) -> list[tuple[int, int]]:
    """Return the places that a product (or sum) joins, with 1, or -1 if divided (subtracted)."""
    place = places[at]
    if place.operation not in ways:
        return [(at, 1)]
    turned = -1 if place.operation == ways[1] else 1
    return _chain(places, place.below[0], ways) + [
        (other, way * turned) for other, way in _chain(places, place.below[1], ways)
    ]


def _product(line: Line, at: int) -> Iterator[Edit]:
    places = line.places
    value, half = line.pair(at)
    for factor, way in _chain(tuple(places.places), at, ("*", "/")):
        size = places.values[factor]
        if not size:
            continue
        family = _sort_of_factor(line, at, factor)
        yield from _factor(line, at, factor, family, (value, half), size if way > 0 else 1 / size)
        tree = places.places[factor].tree
        if isinstance(tree, Binary) and tree.op in SUM:
            yield from _brackets(line, at, factor, value, way)
    yield from _divisor(line, at)


def _factor(
    line: Line, at: int, factor: int, family: str, pair: tuple[float, float], size: float
) -> Iterator[Edit]:
    value, half = pair
    relative = half / abs(value) if value else 0.0
    own, of_own = line.pair(factor)
    again = of_own / abs(own) if own else 0.0

    def edit(family: str, value: float, said: str, more: float = 0.0) -> Edit:
        spread = abs(value) * (relative + more)
        return Edit(family, (at,), value, spread, partial(_said, line, factor, said))

    yield edit(family, value / size, "{} left out")
    if family not in ("load factor", "diameter"):
        yield edit(f"{family} twice", value * size, "{} taken twice", again)
    metre = line.metre(line.places.places[factor].tree)
    if metre != 1.0:
        yield edit(family, value / size * metre, "{} left out, the rest worked in kN and m")
        yield edit(f"{family} twice", value * size / metre, "{} taken twice, worked in kN and m")
    if not _vanishes(line, at, value / size**2):
        yield edit("inverted", value / size**2, "{} on the other side of the fraction bar")


def _vanishes(line: Line, at: int, value: float) -> bool:
    """Tell whether a term of a sum becomes next to nothing: it is told as left out."""
    places = line.places
    above = places.places[at].above
    is_term = above >= 0 and places.places[above].operation in SUM
    return is_term and abs(value) < NOTHING * abs(places.values[at])


def _said(line: Line, at: int, said: str) -> str:
    alone = said.startswith("{}") and isinstance(line.places.places[at].tree, Number)
    return said.format(f"the number {line.text(at)}" if alone else line.text(at))


def _sign(line: Line, at: int) -> str:
    return f"the sign of {line.text(at)} turned"


def _sort_of_factor(line: Line, at: int, factor: int) -> str:
    tree = line.places.places[factor].tree
    if isinstance(tree, Number):
        if line.is_load_factor(factor):
            return "load factor"
        chain = _chain(tuple(line.places.places), at, ("*", "/"))
        near = [line.places.places[k].tree for k, _ in chain]
        if tree.text == "2" and any(isinstance(n, Name) and n.id.startswith("d_b") for n in near):
            return "diameter"
        return "number"
    if isinstance(tree, Name):
        target = line.node.args.get(tree.id, "")
        return "factor" if line.scope.units.get(target) == "" else "quantity"
    is_of_angle = isinstance(tree, Call) and line.places.places[factor].operation in ANGULAR
    return "factor" if is_of_angle else "quantity"


def _brackets(line: Line, at: int, factor: int, value: float, way: int) -> Iterator[Edit]:
    """Give ``k*(a + b)`` as ``k*a + b`` and the like."""
    places = line.places
    terms = _chain(tuple(places.places), factor, ("+", "-"))
    whole = places.values[factor]
    rest = value / whole if way > 0 else value * whole  # all that multiplies the bracket
    words = partial(_said, line, factor, "the brackets around {} forgotten")
    half = sum(places.halves[k] for k, _ in terms) * max(1.0, abs(rest))
    signed = [places.values[k] * sign for k, sign in terms]
    for split in range(1, len(signed)):
        first, last = math.fsum(signed[:split]), math.fsum(signed[split:])
        if way > 0:
            ways = [rest * first + last, first + rest * last]
        else:
            ways = [rest / first + last] if first else []
        left_out = (rest * first, rest * last) if way > 0 else ()
        for other in ways:
            if any(abs(other - alone) <= NOTHING * abs(alone) for alone in left_out):
                continue  # told as the term left out
            spread = half + abs(other) * _relative(line, at)
            yield Edit("brackets", (at,), other, min(spread, abs(other) * 0.02), words)


def _relative(line: Line, at: int) -> float:
    value, half = line.pair(at)
    return half / abs(value) if value else 0.0


def _divisor(line: Line, at: int) -> Iterator[Edit]:
    """Give ``a/(b*c)`` as ``a/b*c``: what stands behind the first divisor multiplies."""
    places = line.places
    for place in places.places:
        if place.operation != "/" or places.places[place.below[1]].operation != "*":
            continue
        if not _inside(places, place.below[1], at):
            continue
        behind = [k for k, way in _chain(tuple(places.places), place.below[1], ("*", "/"))][1:]
        size = math.prod(places.values[k] for k in behind)
        value = places.values[at] * size**2
        words = partial(_said, line, place.below[1], "the brackets around {} forgotten")
        yield Edit("brackets", (at,), value, abs(value) * _relative(line, at), words)


def _inside(places: Places, at: int, top: int) -> bool:
    """Tell whether a place belongs to the product that begins at another."""
    while at != top:
        at = places.places[at].above
        if at < 0 or (at != top and places.places[at].operation not in PRODUCT):
            return False
    return True


def _sum(line: Line, at: int) -> Iterator[Edit]:
    value, half = line.pair(at)
    for term, way in _chain(tuple(line.places.places), at, ("+", "-")):
        size = line.places.values[term] * way

        def edit(family: str, value: float, said: str, term: int = term) -> Edit:
            return Edit(family, (at,), value, half, partial(_said, line, term, said))

        yield edit("term", value - size, "the term {} left out")
        yield edit("sign", value - 2 * size, "the sign of the term {} turned")
        yield edit("term twice", value + size, "the term {} counted twice")


def _power(line: Line, at: int, place: Place) -> Iterator[Edit]:
    base, half = line.pair(place.below[0])
    exponent = line.places.values[place.below[1]]
    text = line.text(place.below[0])
    others = [1.0, 2.0, 3.0, 0.5, 1 / 3]
    usual = {2.0: 1.0, 3.0: 2.0, 1 / 3: 1.0, 0.5: 1.0}.get(exponent)
    for other in others:
        if math.isclose(other, exponent) or base < 0:
            continue
        family = "root" if other in (usual, 1.0) else "power"
        said = partial("the power {:.3g} of {} in place of {:.3g}".format, other, text, exponent)
        metre = line.metre(line.places.places[place.below[0]].tree)
        value = base**other * metre ** (exponent - other)
        if _vanishes(line, at, value):
            continue
        spread = abs(other * value / base) * half if base else half
        yield Edit(family, (at,), value, spread, said)


def _call(line: Line, at: int, place: Place) -> Iterator[Edit]:
    function = place.operation
    first, half = line.pair(place.below[0])
    text = line.text(place.below[0])
    if function in ("sqrt", "cbrt", "abs"):
        yield Edit("root", (at,), first, half, partial("the root of {} forgotten".format, text))
        if function == "sqrt":
            yield Edit("power", (at,), first**2, 2 * abs(first) * half,
                       partial("the square of {} in place of its root".format, text))  # fmt: skip
    elif function in ("min", "max"):
        yield from _branches(line, at, place)
    else:
        yield from _angle(line, at, function, first, half)


def _branches(line: Line, at: int, place: Place) -> Iterator[Edit]:
    pairs = [line.pair(k) for k in place.below]
    other = {"min": max, "max": min}[place.operation](pairs)
    swapped_words = ("largest", "least") if place.operation == "min" else ("least", "largest")
    words = partial("the {} of the values in place of the {}".format, *swapped_words)
    yield Edit("min for max", (at,), *other, words)
    for k in place.below:
        said = partial(_said, line, k, "the branch {} alone, the others forgotten")
        yield Edit("branch", (at,), *line.pair(k), said)
    chosen = {"min": min, "max": max}[place.operation]
    if len(pairs) > 2:  # noqa: PLR2004 - of two branches one is left
        for k in place.below:
            left = chosen(line.pair(j) for j in place.below if j != k)
            yield Edit("branch", (at,), *left, partial(_said, line, k, "the branch {} forgotten"))


def _angle(line: Line, at: int, function: str, angle: float, half: float) -> Iterator[Edit]:
    text = line.text(line.places.places[at].below[0])
    if math.sin(angle):
        # The function of radians, given degrees: one of so many times more degrees.
        value, spread = _in_radians(OPERATIONS[function], angle, half)
        words = partial("{} taken in degrees by a function of radians".format, text)
        yield Edit("degrees", (at,), value, spread, words)
    for other in ANGULAR:
        if other != function and math.sin(math.radians(angle)):
            value = OPERATIONS[other](angle)
            words = partial("{} of {} in place of {}".format, other, text, function)
            yield Edit("function", (at,), value, math.radians(half) * (1 + value**2), words)


def _in_radians(function: Callable[[float], float], angle: float, half: float) -> Pair:
    """Return what a function of degrees gives for an angle taken in radians, at its ends.

    Half a tenth of a degree is 3 degrees then, over which cot is no straight line; between two
    ends of other sign it may be anything, and the slope at the middle is as good.
    """
    value = function(math.degrees(angle))
    ends = [function(math.degrees(angle + way * half)) for way in (-1, 1)]
    low, high = min(ends), max(ends)
    if not low <= value <= high or low * high < 0:
        return value, half * (1 + value**2)
    return (low + high) / 2, (high - low) / 2
