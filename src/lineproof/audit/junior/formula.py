"""One hand-written formula judged: constants typed for lines, the catalogue, foreign rules."""

from __future__ import annotations

import math
from collections.abc import Callable, Iterator, Mapping
from dataclasses import dataclass, field

from lineproof.audit.data import Finding, Severity
from lineproof.audit.graph import Node, Number, evaluated
from lineproof.audit.junior.catalogue import Compared, Said, catalogue_of, compared, likeness
from lineproof.audit.junior.edits import plain, replaced
from lineproof.audit.junior.foreign import foreign_rule
from lineproof.audit.junior.scope import finding, name_of, shown_in
from lineproof.formula import Formula, Name, Tree, names_of
from lineproof.formula import Number as Constant
from lineproof.formula.tree import numbers_of
from lineproof.quantity.units import UNITS, internal_factor
from lineproof.sentences import listed

PLAIN = frozenset(
    [0, 0.25, 0.5, 0.75, 1.5, 2.5, *range(1, 17), 18, 20, 24, 48, 50, 64, 96, 100, 384]
)  # fmt: skip
"""Constants that stand in formulas of statics and geometry."""
_FACTORS = ("phi_c", "phi_s", "f_c", "f_y")
_LEAST_DIGITS = 3
_NO_EFFECT = 0.005
_LONGEST_TEXT = 120
_WITHOUT_DENSITY = "lambda is missing"
_WIDTH_OF_RECTANGLE = "b in place of b_t"

Lookup = Callable[[str], Node | None]


@dataclass(frozen=True, slots=True)
class Hand:
    """A formula that somebody wrote: where it stands, its text, symbol and tree.

    ``numbers`` are the units of its constants; in plain code (``scales``) these are not known,
    and a power of ten may be a conversion. ``unit`` is that of its result.
    """

    where: str
    text: str
    symbol: str
    tree: Tree
    ids: tuple[str, ...] = ()
    numbers: Mapping[str, str] = field(default_factory=dict)
    unit: str = ""
    scales: bool = False


def judged(hand: Hand, find: Lookup, units: Mapping[str, str]) -> Iterator[Finding]:
    """Give what is wrong with a hand formula; ``find`` gives the line that a name stands for."""
    typed = dict(_typed(hand, find))
    swaps: dict[Tree, Tree] = {Constant(text): Name(node.symbol) for text, node in typed.items()}
    tree = replaced(hand.tree, swaps) if swaps else hand.tree
    if typed:
        yield _typed_finding(hand, typed)
    met = compared(hand.symbol, tree, units, scales=hand.scales)
    if met.said is Said.DIFFERS and met.nearest is not None:
        yield _differs(hand, tree, met, met.nearest, find)
    elif met.said is Said.BRANCH and met.nearest is not None and met.left_out is not None:
        yield from _without_limit(hand, tree, met.nearest, find)
    elif met.said is Said.UNLIKE and met.nearest is not None:
        yield _unlike(hand, tree, met.nearest)


def _unlike(hand: Hand, tree: Tree, nearest: Formula) -> Finding:
    rule = foreign_rule(hand.symbol, tree, scales=hand.scales)
    said = f"is the rule of {rule}" if rule else "is a formula of its own"
    return finding(
        Severity.MAJOR if rule else Severity.OBSERVATION,
        f"{hand.where}: {_short(hand.text)} {said}; the catalogue has "
        f"{nearest.text} ({nearest.clause})",
        hand.ids,
        nearest.clause,
        "check the formula by hand",
    )


def _differs(hand: Hand, tree: Tree, met: Compared, nearest: Formula, find: Lookup) -> Finding:
    clause = nearest.clause
    said = listed(map(plain, met.differences))
    mine, right = _both(hand, tree, nearest, find)
    what = f"{hand.where}: {_short(hand.text)} differs from {clause}: {said}"
    rule = foreign_rule(hand.symbol, tree, scales=hand.scales)
    if rule:
        what += f" (it is the rule of {rule})"
    severity = Severity.MAJOR
    if mine is not None and right is not None:
        unit = hand.unit or nearest.unit
        if math.isclose(mine, right, rel_tol=_NO_EFFECT):
            severity = Severity.MINOR
            what += f"; without effect here, both give {shown_in(right, unit)}"
        else:
            what += f"; it gives {shown_in(mine, unit)}, {clause} gives {shown_in(right, unit)}"
    elif said == _WITHOUT_DENSITY:
        severity = Severity.MINOR
        what += "; without effect in concrete of normal density, where it is 1"
    elif said == _WIDTH_OF_RECTANGLE:
        severity = Severity.OBSERVATION
        what += "; that is the same in a rectangle; whether it is one is not shown"
    return finding(
        severity, what, hand.ids, clause, f"{nearest.text}: {nearest.title}; use the catalogue's"
    )  # fmt: skip


def _without_limit(hand: Hand, tree: Tree, nearest: Formula, find: Lookup) -> Iterator[Finding]:
    """Tell a limit left out, unless the values at hand show that it does not govern."""
    mine, right = _both(hand, tree, nearest, find)
    what = f"{hand.where}: {_short(hand.text)} leaves out a limit of {nearest.clause}"
    if mine is None or right is None:
        yield finding(
            Severity.OBSERVATION,
            f"{what}, {nearest.text}; whether it governs is not shown",
            hand.ids,
            nearest.clause,
            "work out both sides of the limit",
        )
    elif not math.isclose(mine, right, rel_tol=1e-9):
        unit = hand.unit or nearest.unit
        yield finding(
            Severity.MAJOR,
            f"{what} that governs, {nearest.text}: it gives {shown_in(mine, unit)} in place of "
            f"{shown_in(right, unit)}",
            hand.ids,
            nearest.clause,
            "use the catalogue's formula",
        )


def _both(
    hand: Hand, tree: Tree, nearest: Formula, find: Lookup
) -> tuple[Number | None, Number | None]:
    """Return what the hand's and the catalogue's formula give at the values at hand."""
    mine, right = value_at(tree, find), value_at(nearest.tree, find)
    if hand.scales and mine and right and mine / right > 0:
        # Code may hold its values in units of its own; a power of ten says nothing.
        mine /= 10.0 ** round(math.log10(mine / right))
    return mine, right


def value_at(tree: Tree, find: Lookup) -> Number | None:
    """Return the value of a tree at the lines that its names stand for, None if one lacks."""
    named: dict[str, Number] = {}
    for name in names_of(tree):
        node = find(name)
        if node is None and name == "b":
            node = find("b_w")
        if node is None:
            return None
        named[name] = node.stored
    try:
        return evaluated(tree, named)
    except (ArithmeticError, ValueError):
        return None


# -- constants typed where a line exists -----------------------------------------------------


def _typed(hand: Hand, find: Lookup) -> Iterator[tuple[str, Node]]:
    """Give the constants that are a line's value, with the line."""
    had = set(names_of(hand.tree))
    nearest = max(
        catalogue_of(hand.symbol), key=lambda f: likeness(hand.tree, f.tree), default=None
    )
    own = {float(text) for text in numbers_of(nearest.tree)} if nearest else set()
    missing = [n for n in nearest.names if n not in had] if nearest else []
    taken: set[str] = set()
    for text in numbers_of(hand.tree):
        if float(text) in own:
            continue
        # A number that the catalogue's formula does not ask for is told where it speaks for itself.
        others = [n for n in _FACTORS if n not in had] if float(text) not in PLAIN else []
        nodes = [node for name in (*missing, *others) if (node := find(name)) is not None]
        met = [node for node in nodes if node.id not in taken and _is_value(text, node, hand)]
        if met:
            taken.add(met[0].id)
            yield text, met[0]


def _is_value(text: str, node: Node, hand: Hand) -> bool:
    """Tell whether a constant is the value of a line, in a unit that the constant may have."""
    if hand.scales:
        units = {str(node.entry["printed"]["unit"]), node.unit, UNITS[node.unit].internal}
    else:
        units = {hand.numbers.get(text, "")}
    number = float(text)
    digits = len(text.replace(".", "").strip("0"))
    for unit in units:
        if unit in UNITS and UNITS[unit].kind == UNITS[node.unit].kind:
            value = node.stored / internal_factor(unit)
            # One or two digits are many a value's rounding: these must be the value itself.
            rounded = float(f"{value:.{digits}g}") if digits >= _LEAST_DIGITS else value
            if math.isclose(number, rounded):
                return True
    return False


def _typed_finding(hand: Hand, typed: Mapping[str, Node]) -> Finding:
    said = listed(
        f"{text} is typed where {name_of(node)} stands" for text, node in typed.items()
    )  # fmt: skip
    return finding(
        Severity.MINOR,
        f"{hand.where}: in {_short(hand.text)} {said}; it does not follow when that changes",
        (*hand.ids, *(node.id for node in typed.values())),
        advice=f"write {', '.join(plain(node.symbol) for node in typed.values())} in its place",
    )


def _short(text: str) -> str:
    return text if len(text) <= _LONGEST_TEXT else text[: _LONGEST_TEXT - 1] + "…"
