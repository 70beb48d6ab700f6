"""The lines of a record that the catalogue did not write: formulas, checks, units."""

from __future__ import annotations

import re
from collections.abc import Iterator
from functools import partial

from lineproof.audit.data import Finding, Severity
from lineproof.audit.graph import Node
from lineproof.audit.junior.catalogue import catalogue_of, is_of_catalogue
from lineproof.audit.junior.edits import plain, text_of
from lineproof.audit.junior.formula import Hand, judged
from lineproof.audit.junior.sample import constant_ratio, equal, points_for, sampled
from lineproof.audit.junior.scope import VALIDATION, Scope, finding, name_of, units_of
from lineproof.formula import Criterion, Tree, names_of, parse_line
from lineproof.formula.tree import Call, numbers_of, walk
from lineproof.record.entry import CRITERIA, LINE
from lineproof.sentences import listed
from lineproof.standards.catalogue import criteria
from lineproof.standards.references import MECHANICS

MOST = 60
"""Different formulas of a record that are compared; no hand calculation has more."""
_TEN = re.compile(r"10{3,9}(\.0*)?\Z|1(\.0*)?[eE]\+?0?[3-9]\Z|0\.0{2,8}1\Z|1(\.0*)?[eE]-0?[3-9]\Z")
_TURN = ("3.14", "57.29", "57.3", "0.01745", "0.0175", "180")
_TRIGONOMETRIC = ("sin", "cos", "tan", "cot")
_CLOSED = frozenset({"statics", "geometry"})
"""Clauses of lines that a beam states for itself, such as sums over its load cases."""


def own_lines(scope: Scope) -> Iterator[Finding]:
    """Give what is wrong with the formulas, checks and units that a designer wrote."""
    if scope.record.data["kind_of_member"] == VALIDATION:
        return
    units = units_of(scope.record)
    seen: dict[tuple[str, str], str] = {}
    for node in scope.graph:
        held: list[Finding] = []
        if node.kind == LINE and _is_to_compare(node):
            symbol, tree = parse_line(node.entry["formula"])
            key = node.part, node.entry["formula"]
            if key in seen:
                continue
            seen[key] = node.id
            if len(seen) > MOST:
                break
            hand = Hand(
                name_of(node), node.entry["formula"], symbol, tree, (node.id,),
                node.entry["numbers"], node.unit,
            )  # fmt: skip
            find = partial(scope.find, part=node.part, args=node.args)
            held = list(judged(hand, find, units))
            # Of lines that a beam states for itself, no other formula is expected.
            if node.entry["basis"]:
                held = [f for f in held if f.severity is not Severity.OBSERVATION]
            yield from held
        if not node.entry["basis"]:
            yield from _units(node, " ".join(found.what for found in held))
            if node.kind in CRITERIA:
                yield from _check(node)
    if len(seen) > MOST:
        yield finding(
            Severity.OBSERVATION,
            f"more than {MOST} formulas of its own; those after them are not compared",
        )


def _is_to_compare(node: Node) -> bool:
    """Tell whether a line's formula is not the catalogue's though the catalogue has its symbol."""
    formula = node.entry["formula"]
    symbol, tree = parse_line(formula)
    known = catalogue_of(symbol)
    if not known or is_of_catalogue(symbol, formula):
        return False
    if not node.entry["basis"] or node.entry["clause"] not in _CLOSED:
        return True
    # What a beam states of itself has symbols of its own, with an index of span and bars.
    names = set(names_of(tree))
    return node.entry["basis"] == MECHANICS and any(
        len(names) > 1 and names <= set(f.names) for f in known
    )


# -- units that only look right --------------------------------------------------------------


def _units(node: Node, told: str) -> Iterator[Finding]:
    """Give units that only look right; ``told`` is what is said of the formula already."""
    if node.kind != LINE:
        return
    _, tree = parse_line(node.entry["formula"])
    where, text = name_of(node), node.entry["formula"]
    symbol = parse_line(text)[0]
    held = {n: unit for n, unit in node.entry["numbers"].items() if n in numbers_of(tree)}
    known = {n: u for f in catalogue_of(symbol) for n, u in f.numbers.items()}
    hidden = {n: unit for n, unit in held.items() if unit and known.get(n) != unit}
    if hidden:
        said = listed(f"{number} is declared in {unit}" for number, unit in hidden.items())
        yield finding(
            Severity.MINOR,
            f"{where}: the unit of {text} is right only because {said}",
            [node.id],
            advice="show where the number comes from, or record it as a given with its unit",
        )
    tens = [n for n in numbers_of(tree) if _TEN.match(n) and n not in held and n not in known]
    tens = [number for number in tens if f"{number} is a factor too much" not in told]
    if tens:
        yield finding(
            Severity.MAJOR,
            f"{where}: {listed(tens)} in {text} converts nothing: the values of a line stand in "
            "coherent units already, so that the result is wrong by that factor",
            [node.id],
            advice="leave the power of ten out",
        )
    turned = [_turned(call) for call in walk(tree) if isinstance(call, Call)]
    for call in filter(None, turned):
        yield finding(
            Severity.MAJOR,
            f"{where}: {call} in {text} turns degrees into radians; the functions of a formula "
            "take degrees",
            [node.id],
            advice="give the angle as it is",
        )


def _turned(call: Call) -> str:
    if call.function not in _TRIGONOMETRIC:
        return ""
    inside = numbers_of(call.args[0])
    return text_of(call) if any(n.startswith(_TURN) for n in inside) else ""


# -- checks by hand --------------------------------------------------------------------------


def _check(node: Node) -> Iterator[Finding]:
    """Compare a check that a designer wrote with the catalogue's of the same symbols."""
    if node.sides is None:
        return
    smaller, larger = _ordered(*node.sides)
    names = {*names_of(smaller), *names_of(larger)}
    told: list[Finding] = []
    for _, test in criteria():
        low, high = _ordered(test.left, test.sign, test.right)
        if {*names_of(low), *names_of(high)} != names or not names:
            continue
        points = points_for(names)
        mine = sampled(smaller, points), sampled(larger, points)
        known = sampled(low, points), sampled(high, points)
        factor = constant_ratio(mine[0] / mine[1], known[0] / known[1])
        if factor == 1:
            return
        if equal(mine[0] / mine[1], known[1] / known[0]):
            told.append(_turned_round(node, test))
        elif factor is not None:
            told.append(_scaled(node, test, factor))
    yield from told[:1]


def _ordered(left: Tree, sign: str, right: Tree) -> tuple[Tree, Tree]:
    return (left, right) if sign.startswith("<") else (right, left)


def _turned_round(node: Node, test: Criterion) -> Finding:
    return finding(
        Severity.CRITICAL,
        f"{name_of(node)}: {node.entry['formula']} asks the reverse of {test.clause}, {test.text}",
        [node.id],
        test.clause,
        "turn the comparison round",
    )


def _scaled(node: Node, test: Criterion, factor: float) -> Finding:
    milder = factor < 1
    return finding(
        Severity.MAJOR if milder else Severity.OBSERVATION,
        f"{name_of(node)}: {node.entry['formula']} asks {'less' if milder else 'more'} than "
        f"{test.clause}, {plain(test.text)}: {factor:.4g} times the utilisation",
        [node.id],
        test.clause,
        "check by the catalogue's criterion",
    )
