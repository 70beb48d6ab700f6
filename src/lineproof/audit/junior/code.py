"""What the code cells of a notebook say, judged as text: formulas, typed values, radians."""

from __future__ import annotations

import ast
import math
import re
from collections.abc import Iterator, Mapping, Sequence
from functools import partial

from lineproof.audit.data import Finding, Severity
from lineproof.audit.graph import Node, evaluated
from lineproof.audit.junior.arithmetic import TRIGONOMETRIC, called, last_name, tree_of
from lineproof.audit.junior.catalogue import catalogue_of
from lineproof.audit.junior.cells import PARAMETERS
from lineproof.audit.junior.formula import Hand, Lookup, judged
from lineproof.audit.junior.givens import RESULTS
from lineproof.audit.junior.python import Assigned, Code, assigned, recorded, written
from lineproof.audit.junior.scope import Scope, finding, name_of, printed, units_of
from lineproof.errors import UserError
from lineproof.formula import Name, Tree, names_of, parse_line
from lineproof.quantity.digits import significant
from lineproof.quantity.units import UNITS, internal_factor, plain_spelling, units_of_kind
from lineproof.record.entry import GIVEN, LOOKUP
from lineproof.sentences import listed
from lineproof.standards.catalogue import NOTATION

MOST = 60
"""Formulas of a notebook that are compared with the catalogue."""
MOST_TYPED = 300
"""Numbers typed in code that are compared with the record."""
_TURN = 2 * math.pi
_OWN = Severity.OBSERVATION
_SAME = 5e-4
_NEAR = 6e-3
_WORD = re.compile(r"[A-Za-z0-9/.·²³⁴^*]+")
_CONVERTED = re.compile(r"\.i?to\([^()]*\)\.(?:m|magnitude)\b")
_BARE = re.compile(r"(?<!\bu)(?<!\bureg)(?<!\bunit)(?<!\bunits)\.(?:m|magnitude)\b")
_HIDDEN_STRESS = frozenset(["kPa", "Pa", "GPa", "psi", "ksi", "psf", "ksf"])


def in_order(codes: Sequence[Code]) -> Iterator[tuple[Assigned, Mapping[str, float]]]:
    """Give every assignment with the values of the names before it, as far as text shows them.

    The mapping changes as the walk goes on.
    """
    values: dict[str, float] = {}
    for code in codes:
        for made in assigned(code):
            yield made, values
            _keep(made, values)


def set_in_cells(
    codes: Sequence[Code],
) -> Iterator[tuple[Code, Mapping[str, float], Mapping[str, list[float | None]]]]:
    """Give every cell with the values known before it, and all that it sets, None for unknown.

    The first mapping changes as the walk goes on.
    """
    values: dict[str, float] = {}
    for code in codes:
        found: dict[str, list[float | None]] = {}
        before = dict(values)
        for made in assigned(code):
            _keep(made, values)
            found.setdefault(made.symbol, []).append(values.get(made.symbol))
        yield code, before, found


def cell_by_cell(codes: Sequence[Code]) -> Iterator[tuple[Code, Mapping[str, float]]]:
    """Give every cell with the values known after it; the mapping changes as the walk goes on."""
    values: dict[str, float] = {}
    for code in codes:
        for made in assigned(code):
            _keep(made, values)
        yield code, values


def _keep(made: Assigned, values: dict[str, float]) -> None:
    """Keep what an assignment gives; what a loop or a branch gives is not known."""
    value = _value(made, values)
    values.pop(made.symbol, None)
    if value is not None and made.plain:
        values[made.symbol] = value


def _value(made: Assigned, values: Mapping[str, float]) -> float | None:
    if made.tree is None or _BARE.search(_CONVERTED.sub("", made.text)):
        return None  # a bare number is in the unit that its quantity happens to have
    if not set(names_of(made.tree)) <= values.keys():
        return None
    try:
        return evaluated(made.tree, values)
    except (ArithmeticError, ValueError):
        return None


def code_findings(codes: Sequence[Code], scope: Scope | None) -> Iterator[Finding]:
    """Give what is wrong with plain Python arithmetic, against the catalogue and the record."""
    units = units_of(scope.record) if scope is not None else {}
    find = partial(_stands, scope)
    compared = typed = 0
    for made, values in in_order(codes):
        if PARAMETERS in made.cell.tags or made.tree is None:
            continue
        if not _is_number(made.tree):
            if is_compared(made) and (compared := compared + 1) <= MOST:
                held = judged(_hand(made), find, units)
                # A letter may be anything in code: only what is like the formula is meant by it.
                yield from (f for f in held if len(made.name) > 1 or f.severity is not _OWN)
            yield from _power_of_ten(made, values, find)
        elif _means_something(made, scope) and (typed := typed + 1) <= MOST_TYPED:
            yield from _typed(made, scope)
    for code, values in cell_by_cell(codes):
        yield from _radians(code, values)
    if compared > MOST or typed > MOST_TYPED:
        yield finding(
            Severity.OBSERVATION,
            f"more than {MOST} formulas or {MOST_TYPED} typed numbers in code; the rest is not "
            "compared",
        )


def is_compared(made: Assigned) -> bool:
    """Tell whether the catalogue has a formula for what an assignment works out."""
    if made.tree is None or _is_number(made.tree) or isinstance(made.tree, Name):
        return False
    # What is worked out of itself, as a largest value in a loop, is counted on and no formula.
    return bool(catalogue_of(made.symbol)) and made.symbol not in names_of(made.tree)


def is_worked(made: Assigned) -> bool:
    """Tell whether an assignment works something out of other names."""
    return made.tree is not None and bool(names_of(made.tree)) and not isinstance(made.tree, Name)


def recorded_findings(codes: Sequence[Code]) -> Iterator[Finding]:
    """Give what is wrong with the formulas that code records, where there is no record of them."""
    lines = [m for code in codes for m in recorded(code) if m.method == "line"]
    for made in [m for m in lines if "=" in m.texts[0]][:MOST]:
        try:
            symbol, tree = parse_line(made.texts[0])
        except UserError as error:
            yield finding(Severity.MINOR, f"{made.cell.name}: {error.faults[0][:200]}")
            continue
        hand = Hand(made.cell.name, made.texts[0], symbol, tree, unit=made.named.get("unit", ""))
        yield from judged(hand, partial(_stands, None), {})


def _stands(scope: Scope | None, name: str) -> Node | None:
    return scope.find(name, "") if scope is not None else None


def _means_something(made: Assigned, scope: Scope | None) -> bool:
    return made.symbol in RESULTS or (scope is not None and made.symbol in scope.by_symbol)


def _hand(made: Assigned) -> Hand:
    unit = NOTATION[made.symbol].unit if made.symbol in NOTATION else ""
    assert made.tree is not None  # noqa: S101 - the caller looked
    return Hand(
        f"{made.cell.name}, {made.name}", f"{made.name} = {made.text}", made.symbol, made.tree,
        unit=unit, scales=True,
    )  # fmt: skip


def _is_number(tree: Tree) -> bool:
    """Tell whether a tree is one typed number, with or without a unit."""
    return not names_of(tree) and len(re.findall(r"Number\(", repr(tree))) <= 2  # noqa: PLR2004


def _power_of_ten(made: Assigned, values: Mapping[str, float], find: Lookup) -> Iterator[Finding]:
    """Tell a result that misses a line's value by a power of ten that no unit of its kind has."""
    node, value = find(made.symbol), _value(made, values)
    if node is None or not value or not node.stored or value * node.stored < 0:
        return
    factors = [internal_factor(unit) for unit in units_of_kind(UNITS[node.unit].kind)]
    if any(math.isclose(value * factor, node.stored, rel_tol=_SAME) for factor in factors):
        return
    ten = round(math.log10(value / node.stored))
    if ten and math.isclose(value / node.stored, 10.0**ten, rel_tol=_SAME):
        yield finding(
            Severity.MAJOR,
            f"{made.cell.name}, {made.name}: {made.name} = {made.text} gives {value:.4g}; "
            f"{name_of(node)} is {printed(node)}, and no unit of its kind makes the two one: a "
            "power of ten is lost",
            [node.id],
            advice="write the unit of every value beside it; kN with mm gives kN.mm, not kN.m",
        )


# -- values typed in code --------------------------------------------------------------------


def _typed(made: Assigned, scope: Scope | None) -> Iterator[Finding]:
    """Compare a number typed in code with what the record holds for its symbol."""
    nodes = scope.by_symbol.get(made.symbol, ()) if scope is not None else ()
    value = _value(made, {})
    letter = len(made.name) == 1  # which may be anything in code
    where = f"{made.cell.name}: {made.name} = {made.text}"
    if not value:  # nothing known, or a sum that begins with nothing
        return
    if not nodes:
        if made.symbol in RESULTS and not letter:
            yield finding(
                Severity.MINOR,
                f"{where} is typed though a calculation works it out; nothing shows where it "
                "comes from",
                clause=catalogue_of(made.symbol)[0].clause if catalogue_of(made.symbol) else "",
                advice="show the line that gives it",
            )
        return
    said = _unit_said(made)
    met = [(node, unit) for node in nodes if (unit := _unit_met(value, node)) is not None]
    if said and all(UNITS[said].kind == UNITS[node.unit].kind for node in nodes):
        agreeing = [n for n in nodes if _same(value * internal_factor(said), n.stored)]
        if not agreeing and met:
            node, unit = met[0]
            yield finding(
                Severity.MAJOR,
                f"{where} is said to be in {said}; {name_of(node)} has {printed(node)}, which is "
                f"that number in {unit or 'no unit'}",
                [node.id],
                advice="correct the unit, and look where the value is used",
            )
            return
    if met or not letter:
        yield from _against(where, made, met, nodes)


def _against(
    where: str, made: Assigned, met: Sequence[tuple[Node, str]], nodes: Sequence[Node]
) -> Iterator[Finding]:
    usual = [node for node, unit in met if unit not in _HIDDEN_STRESS]
    if usual and usual[0].kind not in (GIVEN, LOOKUP):
        yield finding(
            Severity.MINOR,
            f"{where} is typed where {name_of(usual[0])} stands, {printed(usual[0])}; it does not "
            "follow when that changes",
            [usual[0].id],
            str(usual[0].entry["clause"]),
            "take the value from its line",
        )
    elif met and not usual:
        node, unit = met[0]
        yield finding(
            Severity.MINOR,
            f"{where} is {printed(node)} of {name_of(node)} in {unit}; formulas of the standard "
            "take MPa",
            [node.id],
            advice="type it in MPa, or show the conversion",
        )
    elif not met:
        yield finding(
            Severity.MAJOR if len(nodes) == 1 else Severity.MINOR,
            f"{where}; the record has "
            f"{listed((f'{printed(n)} at {name_of(n)}' for n in nodes), 3)}",
            [node.id for node in nodes[:3]],
            advice=f"find out which value of {made.symbol.rstrip('_')} holds",
        )


def _unit_met(value: float, node: Node) -> str | None:
    """Return the unit in which a number is a line's value, to the digits typed; None if none."""
    kind = UNITS[node.unit].kind
    first = [node.unit, str(node.entry["printed"]["unit"]), UNITS[node.unit].internal]
    for unit in dict.fromkeys([*first, *units_of_kind(kind)]):
        if _same(value, node.stored / internal_factor(unit)):
            return unit
    return None


def _same(typed: float, value: float) -> bool:
    """Tell whether a typed number is a value rounded to its digits, three at least."""
    if not math.isclose(typed, value, rel_tol=_NEAR):
        return False
    digits = max(len(f"{typed:.10g}".lstrip("-0.").replace(".", "").rstrip("0")), 3)
    return math.isclose(typed, float(significant(value, digits)), rel_tol=1e-9, abs_tol=1e-12)


def _unit_said(made: Assigned) -> str:
    """Return the unit that the comment behind an assignment names first, "" if none."""
    for word in _WORD.findall(made.comment[:80]):
        unit = plain_spelling(word.strip("."))
        if unit in UNITS and unit and (unit not in ("m", "in", "h", "d", "min") or word == unit):
            return unit if unit not in ("in", "h", "d", "min") else ""
    return ""


# -- angles ----------------------------------------------------------------------------------


def _radians(code: Code, values: Mapping[str, float]) -> Iterator[Finding]:
    if code.tree is None:
        return
    lines = code.source.split("\n")
    for node in ast.walk(code.tree):
        if not isinstance(node, ast.Call) or called(node) not in TRIGONOMETRIC or not node.args:
            continue
        if isinstance(node.func, ast.Name) and node.func.id not in TRIGONOMETRIC:
            continue
        tree = tree_of(node.args[0])
        if tree is None or not set(names_of(tree)) <= values.keys():
            continue
        try:
            angle = evaluated(tree, values)
        except (ArithmeticError, ValueError):
            continue
        if abs(angle) > _TURN:
            text = written(lines, node)[:80]
            yield finding(
                Severity.MAJOR,
                f"{code.cell.name}: {text} takes an angle of {angle:.4g} as radians; it is in "
                "degrees",
                clause="11.3.5" if last_name(node.args[0]).startswith("theta") else "",
                advice="write math.radians(...) around the angle",
            )
