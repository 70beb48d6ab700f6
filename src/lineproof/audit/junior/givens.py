"""Values that a designer typed though the calculation should work them out, or has them already."""

from __future__ import annotations

import math
from collections.abc import Iterator
from functools import partial

from lineproof.audit.data import Finding, Severity
from lineproof.audit.graph import Node
from lineproof.audit.junior.catalogue import catalogue_of
from lineproof.audit.junior.formula import value_at
from lineproof.audit.junior.scope import (
    Scope,
    finding,
    name_of,
    printed,
    shown_in,
    stands_for,
)
from lineproof.formula import Formula
from lineproof.quantity.units import UNITS, internal_factor
from lineproof.record.entry import GIVEN
from lineproof.record.recompute import close
from lineproof.sheet import LookupTable
from lineproof.standards.catalogue import tables

RESULTS = frozenset({
    "M_f", "V_f", "T_f", "M_r", "V_r", "T_r", "V_c", "V_s", "V_rmax", "M_cr", "T_cr", "a", "c",
    "d_v", "alpha_1", "beta_1", "E_c", "f_r", "A_smin", "A_sr", "A_vmin", "s_max", "l_d", "l_d0",
    "l_dh", "l_s", "I_g", "I_cr", "I_e", "M_a", "M_rb", "C_f", "C_w", "F_lt", "A_lt", "eps_x",
    "z", "w_f", "w_f1", "w_f2", "w_f3", "delta_i", "delta_t", "delta_L", "delta_at", "delta_max",
    "A_s", "A_v", "d",
})  # fmt: skip
"""Symbols that a calculation works out; typed, nothing shows where they come from."""
BY_ANALYSIS = frozenset(["M_f", "V_f", "T_f", "A_s", "d"])
"""Of those, what may come from a drawing or an analysis, and whose formula depends on the case."""
CONSTANTS = frozenset(["phi_c", "phi_s", "lambda_", "E_s", "eps_cu"])
"""Symbols whose values a table of the standard gives."""
SHARED = frozenset(
    ["f_c", "f_y", "gamma_c", "b_w", "h", "h_f", "a_max", "c_c", "s_b", *CONSTANTS]
)  # fmt: skip
"""Symbols that mean one thing in the whole of a calculation."""
_PARTIAL = frozenset(["A_sb"])
"""What only a study of sections makes bars of."""
_NEAR = 0.02


def own_givens(scope: Scope) -> Iterator[Finding]:
    """Give the typed values of the designer's own parts that should have been worked out."""
    for node in scope.graph:
        if node.kind == GIVEN and node.part in scope.own_parts:
            yield from _again(node, scope)
            yield from _constant(node)
            yield from _computed(node, scope)


def _again(node: Node, scope: Scope) -> Iterator[Finding]:
    """Tell a value that stands before it in the calculation already."""
    before = [n for n in scope.by_symbol[node.symbol] if scope.order[n.id] < scope.order[node.id]]
    if node.symbol not in SHARED or not before:
        return
    first = before[0]
    if not all(close(other.stored, first.stored) for other in before):
        return
    same = close(first.stored, node.stored)
    what = f"{name_of(node)}: {node.symbol} is typed {printed(node)}"
    yield finding(
        Severity.OBSERVATION if same else Severity.MAJOR,
        f"{what}, as it stands at {name_of(first)} already"
        if same
        else f"{what}, but {printed(first)} stands at {name_of(first)}",
        [node.id, first.id],
        advice="use one line for both, so that a change is made in one place",
    )


def _constant(node: Node) -> Iterator[Finding]:
    """Tell a constant of the standard that is typed otherwise than its table has it."""
    if node.symbol not in CONSTANTS:
        return
    held = [table for _, table in tables() if node.symbol in table.columns]
    texts = [
        row[node.symbol] for table in held for row in table.rows.values() if node.symbol in row
    ]
    values = [float(text) * internal_factor(node.unit) for text in texts]
    if held and not any(close(value, node.stored) for value in values):
        yield _off_table(node, held[0], texts)


def _off_table(node: Node, table: LookupTable, texts: list[str]) -> Finding:
    return finding(
        Severity.MAJOR,
        f"{name_of(node)}: {node.symbol.rstrip('_')} is typed {printed(node)}; {table.source} has "
        f"{' or '.join(texts)}",
        [node.id],
        table.clause_of(node.symbol),
        "look it up, or say what allows the other value",
    )


def _computed(node: Node, scope: Scope) -> Iterator[Finding]:
    """Tell a value that a formula of the catalogue gives."""
    known = [f for f in catalogue_of(node.symbol) if not _PARTIAL & set(f.names)]
    found = partial(scope.find, part=node.part)
    worked: list[tuple[Formula, float]] = []
    for formula in known:
        value = value_at(formula.tree, found)
        rests = [found(name) for name in formula.names]
        # What rests on the typed value itself says nothing about it.
        if value is not None and not _rests_on(node, rests, scope):
            worked.append((formula, value))
    if not known:
        return
    agreeing = [f for f, value in worked if stands_for(node).holds(value)]
    table = _of_table(node)
    if table is not None:
        yield _looked_up(node, table)
    elif agreeing:
        yield _follows(node, agreeing[0])
    elif worked:
        nearest = min(worked, key=lambda pair: abs(pair[1] - node.stored))
        near = math.isclose(nearest[1], node.stored, rel_tol=_NEAR)
        doubtful = node.symbol in BY_ANALYSIS and len(known) > 1
        yield _other(node, nearest, Severity.MINOR if near or doubtful else Severity.MAJOR)
    elif node.symbol in RESULTS:
        yield _unshown(node)


def _of_table(node: Node) -> LookupTable | None:
    """Return the table that holds the value, if one has the symbol."""
    for _, table in tables():
        unit = table.columns.get(node.symbol)
        texts = [row[node.symbol] for row in table.rows.values() if node.symbol in row]
        if unit in UNITS and any(
            close(float(text) * internal_factor(unit), node.stored) for text in texts
        ):
            return table
    return None


def _looked_up(node: Node, table: LookupTable) -> Finding:
    return finding(
        Severity.OBSERVATION,
        f"{name_of(node)}: {node.symbol} = {printed(node)} is typed; the table {table.name!r} "
        f"({table.source}) has it for some rows only",
        [node.id],
        table.clause_of(node.symbol),
        "look it up by its row, so that what it holds for is shown",
    )


def _rests_on(node: Node, nodes: list[Node | None], scope: Scope) -> bool:
    ids = [n.id for n in nodes if n is not None]
    return node.id in ids or node.id in scope.graph.above(ids)


def _follows(node: Node, formula: Formula) -> Finding:
    return finding(
        Severity.OBSERVATION,
        f"{name_of(node)}: {node.symbol} = {printed(node)} is typed; {formula.text} gives it",
        [node.id],
        formula.clause,
        "record the formula, so that the value follows its inputs",
    )


def _other(node: Node, worked: tuple[Formula, float], severity: Severity) -> Finding:
    formula, value = worked
    return finding(
        severity,
        f"{name_of(node)}: {node.symbol} is typed {printed(node)}; {formula.text} "
        f"({formula.clause}) gives {shown_in(value, node.unit)}",
        [node.id],
        formula.clause,
        "record the formula, or say where the value comes from",
    )


def _unshown(node: Node) -> Finding:
    source = str(node.entry["source"]).strip()
    said = f"its source is {source[:60]!r}" if source else "nothing shows where it comes from"
    return finding(
        Severity.OBSERVATION if source else Severity.MINOR,
        f"{name_of(node)}: {node.symbol} = {printed(node)} is typed though a calculation works it "
        f"out; {said}",
        [node.id],
        catalogue_of(node.symbol)[0].clause,
        "show the line that gives it",
    )
