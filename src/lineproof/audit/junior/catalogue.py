"""A hand-written formula against the catalogue's formulas for the same symbol."""

from __future__ import annotations

import math
import re
from collections.abc import Iterable, Iterator, Mapping
from dataclasses import dataclass
from enum import StrEnum
from functools import cache
from itertools import islice

from lineproof.audit.junior.edits import ONE, branches, replaced
from lineproof.audit.junior.naming import PLAINEST, UNEXPLAINED, Named, named_difference
from lineproof.audit.junior.sample import (
    Values,
    constant_ratio,
    points_for,
    power_of_ten,
    sampled,
)
from lineproof.formula import Formula, Name, Number, Tree, names_of
from lineproof.formula.algebra import expression
from lineproof.formula.tree import numbers_of, walk
from lineproof.standards.catalogue import NOTATION, formulas

STANDS_FOR = {"b": ("b_w", "b_f"), "b_w": ("b",)}
"""Symbols of the catalogue and what a hand formula may call them."""
_SAME_THING = ("b_t", "b_tr")
"""Symbols whose formula names another symbol only, and which may be written out by it."""
LIKE = 0.3
"""Share of symbols in common from which a formula is compared in words."""
_MOST_FORMS = 40
_LARGEST = 150
_DEGREES_IN_RADIAN = 57.29577951308232
_MOST_NAMED = 3
_CLOSE = 0.5
_CLOSE_UNEXPLAINED = 0.6
_PROVABLE = 90
_INDEX = re.compile(r"_?[0-9]{1,2}\Z")


class Said(StrEnum):
    """What comes of a comparison."""

    AGREES = "agrees"
    BRANCH = "agrees where a limit does not govern"
    DIFFERS = "differs"
    UNLIKE = "nothing like it"


@dataclass(frozen=True, slots=True)
class Compared:
    """A hand formula compared.

    ``nearest`` is the formula of the catalogue that it agrees with or comes nearest to, None where
    nothing is like it; ``differences`` say in words what differs; ``left_out`` is the form of the
    whole formula where only a branch agrees; ``proved`` tells that algebra confirmed an agreement;
    ``power`` is the power of ten by which values in other units differ.
    """

    said: Said
    nearest: Formula | None = None
    differences: tuple[str, ...] = ()
    missing: tuple[str, ...] = ()
    left_out: Tree | None = None
    proved: bool = False
    power: int = 0


@cache
def catalogue_of(symbol: str) -> tuple[Formula, ...]:
    """Return the catalogue's formulas for a symbol, each text once."""
    return _by_symbol().get(symbol, ())


@cache
def _by_symbol() -> dict[str, tuple[Formula, ...]]:
    found: dict[str, dict[str, Formula]] = {}
    for _, formula in formulas():
        found.setdefault(formula.symbol, {}).setdefault(_tight(formula.text), formula)
    return {symbol: tuple(texts.values()) for symbol, texts in found.items()}


def _tight(text: str) -> str:
    return "".join(text.split())


def is_of_catalogue(symbol: str, text: str) -> bool:
    """Tell whether a formula stands in the catalogue as it is written."""
    return any(_tight(text) == _tight(formula.text) for formula in catalogue_of(symbol))


def compared(
    symbol: str, tree: Tree, units: Mapping[str, str] | None = None, *, scales: bool = False
) -> Compared:
    """Compare a formula with the catalogue's for its symbol.

    ``units`` are those of names that the notation does not know. With ``scales`` a power of ten
    is taken for a conversion of units, as plain numbers in code need it.
    """
    known = catalogue_of(symbol)
    if not known:
        return Compared(Said.UNLIKE)
    if sum(1 for _ in islice(walk(tree), _LARGEST + 1)) > _LARGEST:
        return Compared(Said.UNLIKE, known[0])
    met = [_agreement(tree, formula, units or {}, scales=scales) for formula in known]
    agreed = [one for one in met if one is not None]
    if agreed:
        return min(agreed, key=lambda one: one.said is not Said.AGREES)
    if scales:
        tree = _without_conversions(tree, known)
    return _in_words(tree, known, units or {})


def _in_words(tree: Tree, known: Iterable[Formula], units: Mapping[str, str]) -> Compared:
    """Return what differs from the formula that comes nearest, in the plainest words."""
    pairs = sorted(
        (pair for formula in known for pair in _nearest_forms(tree, formula)),
        key=lambda pair: -likeness(*pair[:2]),
    )
    best: tuple[Formula, Named] | None = None
    for mine, theirs, formula in pairs[:_MOST_NAMED]:
        alike = likeness(mine, theirs)
        if alike < LIKE or (best is not None and best[1].cost <= PLAINEST):
            break
        told = named_difference(mine, theirs, units)
        explained = told.cost < UNEXPLAINED or alike >= _CLOSE_UNEXPLAINED
        if explained and (best is None or told.cost < best[1].cost):
            best = formula, told
    if best is None:
        return Compared(Said.UNLIKE, pairs[0][2])
    formula, told = best
    left_out = formula.tree if told.without_limit else None
    return Compared(Said.DIFFERS, formula, told.words, told.missing, left_out)


def _without_conversions(tree: Tree, known: Iterable[Formula]) -> Tree:
    """Return plain arithmetic without its powers of ten and turns of angles, for naming."""
    own = {float(text) for formula in known for text in numbers_of(formula.tree)}
    convert = [
        text for text in numbers_of(tree)
        if float(text) not in own and _is_conversion(float(text))
    ]  # fmt: skip
    swaps: dict[Tree, Tree] = {Number(text): ONE for text in convert}
    return replaced(tree, swaps) if swaps else tree


def _is_conversion(number: float) -> bool:
    if math.isclose(number, _DEGREES_IN_RADIAN):
        return True
    power = power_of_ten(number)
    return power is not None and abs(power) > 1


def _nearest_forms(tree: Tree, formula: Formula) -> Iterator[tuple[Tree, Tree, Formula]]:
    """Give the hand's tree and the catalogue's, also with a symbol of one written out."""
    hand = _aligned(tree, formula.tree)
    yield hand, formula.tree, formula
    if likeness(hand, formula.tree) < _CLOSE:
        forms = [(pair.mine, pair.theirs) for pair in _inlined(hand, formula.tree)]
        mine, theirs = max(forms, key=lambda pair: likeness(*pair))
        if mine is not hand or theirs is not formula.tree:
            yield mine, theirs, formula


def likeness(tree: Tree, other: Tree) -> float:
    """Return the share of symbols that two trees have in common."""
    first, second = set(names_of(tree)), set(names_of(other))
    return len(first & second) / max(len(first | second), 1)


def _aligned(tree: Tree, other: Tree) -> Tree:
    """Return a hand formula with the catalogue's names for what they stand for."""
    had, wanted = names_of(tree), names_of(other)
    swaps: dict[Tree, Tree] = {}
    taken = set(had)
    for name in had:
        if name in wanted:
            continue
        stem = _INDEX.sub("", name)
        general = [g for g, stands in STANDS_FOR.items() if name in stands and g in wanted]
        if name not in NOTATION and stem != name:
            general.append(stem)
        for candidate in general:
            if candidate in wanted and candidate not in taken:
                swaps[Name(name)] = Name(candidate)
                taken.add(candidate)
                break
    return replaced(tree, swaps) if swaps else tree


@dataclass(frozen=True, slots=True)
class _Pair:
    """Both trees to compare; ``whole`` is the catalogue's with the limits that a branch lacks."""

    mine: Tree
    theirs: Tree
    whole: Tree | None = None


def _agreement(
    tree: Tree, formula: Formula, units: Mapping[str, str], *, scales: bool
) -> Compared | None:
    hand = _aligned(tree, formula.tree)
    for pair in _inlined(hand, formula.tree):
        if set(names_of(pair.mine)) != set(names_of(pair.theirs)):
            continue
        points = points_for(names_of(pair.mine), units)
        value = sampled(pair.mine, points)
        power = _same(value, sampled(pair.theirs, points), scales=scales)
        if power is None:
            continue
        if pair.whole is not None:
            return Compared(Said.BRANCH, formula, left_out=pair.whole, power=power)
        proved = power == 0 and _proved(pair.mine, pair.theirs)
        return Compared(Said.AGREES, formula, proved=proved, power=power)
    return None


def _same(first: Values, second: Values, *, scales: bool) -> int | None:
    factor = constant_ratio(first, second)
    power = None if factor is None else power_of_ten(factor)
    return power if scales or power == 0 else None


def _inlined(hand: Tree, theirs: Tree) -> list[_Pair]:
    """Return both trees; branches; a symbol of one written out where the other lacks it."""
    had, wanted = set(names_of(hand)), set(names_of(theirs))
    pairs = [_Pair(hand, theirs)]
    pairs += [_Pair(hand, form, theirs) for form in branches(theirs)]
    pairs += [
        _Pair(hand, form, theirs)
        for branch in branches(theirs)
        for form, _ in _written_out(branch, set(names_of(branch)) - had, had)
    ]
    pairs += [
        _Pair(form, theirs, None if whole is form else theirs)
        for form, whole in _written_out(hand, had - wanted, wanted)
    ]
    pairs += [
        _Pair(hand, form, None if whole is form else whole)
        for form, whole in _written_out(theirs, wanted - had, had)
    ]
    return pairs[:_MOST_FORMS]


def _written_out(tree: Tree, names: set[str], other: set[str]) -> Iterator[tuple[Tree, Tree]]:
    """Give a tree with a symbol written out by its formula or a branch of it, and by all of it."""
    for name in sorted(names):
        for formula in catalogue_of(name):
            if not set(formula.names) & other:
                continue
            whole = replaced(tree, {Name(name): formula.tree})
            if not isinstance(formula.tree, Name) or name in _SAME_THING:
                yield whole, whole
            for form in branches(formula.tree)[:2]:
                if not isinstance(form, Name):
                    yield replaced(tree, {Name(name): form}), whole


def _proved(first: Tree, second: Tree) -> bool:
    """Prove two trees equal by algebra, where that is quick: no min, max, nothing long."""
    import sympy  # noqa: PLC0415 - 0.25 s, only for algebra

    difference = expression(first) - expression(second)
    if difference.has(sympy.Min, sympy.Max) or difference.count_ops() > _PROVABLE:
        return False
    above, _ = sympy.fraction(sympy.together(difference))
    return bool(sympy.expand(above) == 0)
