"""What differs between a hand formula and the catalogue's, in the words of a checker."""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Mapping
from dataclasses import dataclass, replace
from itertools import islice, permutations

from lineproof.audit.junior.edits import ONE, branches, plain, replaced, slips
from lineproof.audit.junior.sample import (
    Values,
    constant_ratio,
    is_usual,
    points_for,
    sampled,
)
from lineproof.formula import Call, Name, Number, Tree, names_of
from lineproof.formula.tree import numbers_of, walk
from lineproof.quantity.units import UNITS
from lineproof.standards.catalogue import NOTATION

MOST_TRIALS = 200
"""Trials of edits for one pair of formulas, so that a long formula takes no longer than that."""
PLAINEST = 12
"""Cost of a difference in one thing: nothing plainer is looked for."""
_MOST_CHOICES = 60
UNEXPLAINED = 100
"""Cost of a difference of which only the symbols can be said."""
_MOST_EXCHANGED = 3
_MISSING, _PLACED, _FACTOR, _LIMIT, _UNUSUAL = 10, 10, 12, 5, 3


@dataclass(frozen=True, slots=True)
class Named:
    """A difference in words: ``cost`` is the smaller the plainer; ``missing`` are symbols.

    ``without_limit`` tells that a limit, a min or a max, is left out besides.
    """

    words: tuple[str, ...]
    cost: int
    missing: tuple[str, ...] = ()
    without_limit: bool = False


@dataclass(frozen=True, slots=True)
class _Edit:
    """The catalogue's tree and the hand's, made alike by what ``words`` say."""

    theirs: Tree
    mine: Tree
    words: tuple[str, ...]
    cost: int


def named_difference(hand: Tree, theirs: Tree, units: Mapping[str, str]) -> Named:
    """Name what differs: symbols missing or extra, constants changed, signs, a factor."""
    points = points_for({*names_of(hand), *names_of(theirs)}, units)
    missing = tuple(n for n in names_of(theirs) if n not in names_of(hand))
    best: Named | None = None
    left, written = MOST_TRIALS, sampled(hand, points)
    for form in (theirs, *_like(branches(theirs), hand)):
        share = MOST_TRIALS if form is theirs else min(MOST_TRIALS // 4, left)
        for edit in islice(_edits(hand, form, units), share):
            mine = written if edit.mine is hand else sampled(edit.mine, points)
            told = _told(edit, mine, sampled(edit.theirs, points), limited=form is not theirs)
            if told is not None and (best is None or told.cost < best.cost):
                best = told
        if form is not theirs:
            left -= share
        if left <= 0 or (best is not None and best.cost <= PLAINEST):
            break
    if best is not None:
        return replace(best, missing=missing)
    return Named(_by_names(hand, theirs), UNEXPLAINED, missing)


def _like(forms: Iterable[Tree], hand: Tree) -> list[Tree]:
    """Return the forms that have as many limits as the hand's formula has."""
    return [form for form in forms if _limits(form) == _limits(hand)]


def _limits(tree: Tree) -> int:
    return sum(isinstance(n, Call) and n.function in ("min", "max") for n in walk(tree))


def _told(edit: _Edit, mine: Values, theirs: Values, *, limited: bool) -> Named | None:
    factor = constant_ratio(mine, theirs)
    if factor is None:
        return None
    words, cost = edit.words, edit.cost + (_LIMIT if limited else 0)
    if factor != 1:
        words, cost = (*words, _factor(factor)), cost + _FACTOR
    # A factor alone explains what nothing else does, but not beside several other edits.
    if not words or (factor != 1 and len(words) > 2):  # noqa: PLR2004 - one edit and the factor
        return None
    return Named(words, cost, without_limit=limited)


def _factor(factor: float) -> str:
    if factor == -1:
        return "the sign is turned"
    turned = ", with the sign turned" if factor < 0 else ""
    return f"it gives {abs(factor):.4g} times as much{turned}"


def _edits(hand: Tree, theirs: Tree, units: Mapping[str, str]) -> Iterator[_Edit]:
    """Give pairs of trees made alike in symbols and constants, the plainest first."""
    bases = list(islice(_by_symbols(hand, theirs, units), _MOST_CHOICES))
    for base in bases:
        yield base
        yield from _by_constants(base)
    yield from _without_terms(hand, theirs, units)
    for base in bases:
        for form, words in slips(base.theirs):
            yield _Edit(form, base.mine, (*base.words, words), base.cost + _PLACED)


def _without_terms(hand: Tree, theirs: Tree, units: Mapping[str, str]) -> Iterator[_Edit]:
    """Give forms in which a slip takes missing symbols away with all that stands beside them."""
    missing = set(names_of(theirs)) - set(names_of(hand))
    for form, words in slips(theirs):
        if set(names_of(form)) - set(names_of(hand)) < missing:
            for edit in islice(_by_symbols(hand, form, units), _MOST_CHOICES):
                yield replace(edit, words=(words, *edit.words), cost=edit.cost + _PLACED)


def _by_symbols(hand: Tree, theirs: Tree, units: Mapping[str, str]) -> Iterator[_Edit]:
    had, wanted = names_of(hand), names_of(theirs)
    missing = [name for name in wanted if name not in had]
    extra = [name for name in had if name not in wanted]
    foreign = [n for n in numbers_of(hand) if n not in numbers_of(theirs)]
    start = _Edit(theirs, hand, (), 0)
    for edit, left in _placed(start, missing, extra, foreign, units):
        mine, words = edit.mine, edit.words
        for name in left:
            mine = replaced(mine, {Name(name): ONE})
            words = (*words, f"{plain(name)} is not in it")
        yield _Edit(edit.theirs, mine, words, edit.cost + _MISSING * len(left))
    if not missing and len(had) > 1:  # a symbol stands where another belongs
        yield from _exchanged(hand, theirs, units)


def _placed(
    edit: _Edit, missing: list[str], extra: list[str], foreign: list[str], units: Mapping[str, str]
) -> Iterator[tuple[_Edit, list[str]]]:
    """Give every way to account for the missing symbols, with the extra ones that are left."""
    if not missing:
        yield edit, extra
        return
    name, rest = missing[0], missing[1:]
    for other in extra:
        if _kind(other, units) == _kind(name, units):
            swapped = replaced(edit.theirs, {Name(name): Name(other)})
            words = (*edit.words, f"{plain(other)} in place of {plain(name)}")
            left = [e for e in extra if e != other]
            made = _Edit(swapped, edit.mine, words, edit.cost + _PLACED)
            yield from _placed(made, rest, left, foreign, units)
    for number in foreign:
        if float(number) == 1:
            continue
        swapped = replaced(edit.theirs, {Name(name): Number(number)})
        words = (*edit.words, f"{number} in place of {plain(name)}")
        cost = edit.cost + _PLACED + (0 if is_usual(name, float(number)) else _UNUSUAL)
        made = _Edit(swapped, edit.mine, words, cost)
        yield from _placed(made, rest, extra, [f for f in foreign if f != number], units)
    without = replaced(edit.theirs, {Name(name): ONE})
    words = (*edit.words, f"{plain(name)} is missing")
    made = _Edit(without, edit.mine, words, edit.cost + _MISSING)
    yield from _placed(made, rest, extra, foreign, units)


def _kind(name: str, units: Mapping[str, str]) -> str:
    unit = NOTATION[name].unit if name in NOTATION else units.get(name, "")
    return UNITS[unit].kind if unit in UNITS else ""


def _exchanged(hand: Tree, theirs: Tree, units: Mapping[str, str]) -> Iterator[_Edit]:
    names = names_of(theirs)
    for name in names:
        for other in names:
            if name != other and _kind(name, units) == _kind(other, units):
                swapped = replaced(theirs, {Name(name): Name(other)})
                yield _Edit(swapped, hand, (f"{plain(other)} in place of {plain(name)}",), _PLACED)


def _by_constants(edit: _Edit) -> Iterator[_Edit]:
    """Give the pair with constants made alike: exchanged, one left out, one too many."""
    mine, theirs = numbers_of(edit.mine), numbers_of(edit.theirs)
    known = {float(text) for text in theirs}
    foreign = [text for text in mine if float(text) not in known]
    absent = [text for text in theirs if float(text) not in {float(own) for own in mine}]
    for wanted in theirs:
        for number in mine:
            if float(wanted) != float(number):
                yield _exchange(edit, {wanted: number})
    for wanted in absent:
        dropped = replaced(edit.theirs, {Number(wanted): ONE})
        words = (*edit.words, f"{wanted} is missing")
        yield _Edit(dropped, edit.mine, words, edit.cost + _PLACED + 1)
    for number in foreign:
        dropped = replaced(edit.mine, {Number(number): ONE})
        words = (*edit.words, f"{number} is a factor too much")
        yield _Edit(edit.theirs, dropped, words, edit.cost + _PLACED)
    if 1 < len(absent) == len(foreign) <= _MOST_EXCHANGED:
        for order in permutations(foreign):
            yield _exchange(edit, dict(zip(absent, order, strict=True)))


def _exchange(edit: _Edit, swaps: Mapping[str, str]) -> _Edit:
    trees: dict[Tree, Tree] = {Number(wanted): Number(given) for wanted, given in swaps.items()}
    words = tuple(
        f"{given} in place of {wanted}" if float(given) != 1 else f"{wanted} is missing"
        for wanted, given in swaps.items()
    )
    cost = edit.cost + _PLACED * len(swaps)
    return _Edit(replaced(edit.theirs, trees), edit.mine, (*edit.words, *words), cost)


def _by_names(hand: Tree, theirs: Tree) -> tuple[str, ...]:
    """Say what can be said without knowing how the forms differ."""
    had, wanted = names_of(hand), names_of(theirs)
    missing = [plain(name) for name in wanted if name not in had]
    extra = [plain(name) for name in had if name not in wanted]
    words = []
    if missing:
        words.append(f"{', '.join(missing)} {'is' if len(missing) == 1 else 'are'} missing")
    if extra:
        words.append(f"{', '.join(extra)} {'is' if len(extra) == 1 else 'are'} not in it")
    return (*words, "its form is another one")
