"""Outputs older than inputs: runs out of order, cells not run, inputs changed since."""

from __future__ import annotations

import ast
import math
import re
from collections.abc import Iterable, Iterator, Mapping, Sequence
from typing import Any

from lineproof.audit.data import Finding, Severity
from lineproof.audit.junior.arithmetic import symbol_of
from lineproof.audit.junior.cells import CODE, PARAMETERS, Cell
from lineproof.audit.junior.code import set_in_cells
from lineproof.audit.junior.python import Code, Recorded, assigned, recorded
from lineproof.audit.junior.scope import Scope, finding, name_of
from lineproof.audit.junior.when import When
from lineproof.errors import UserError
from lineproof.quantity import read_quantity
from lineproof.record.entry import CRITERIA, GIVEN, LINE
from lineproof.record.recompute import close
from lineproof.sentences import listed

RUN_ALL = "run all cells from the top, then save"
_WHEN = {
    When.ALWAYS: (Severity.MAJOR, "", RUN_ALL),
    When.BRANCH: (
        Severity.MINOR, ": it stands in a branch that was not run, or was changed since", RUN_ALL,
    ),
    When.LOOP: (
        Severity.MAJOR, ": it stands in a loop that was not run, or was changed since", RUN_ALL,
    ),
    When.CALLED: (
        Severity.MAJOR, ": it stands in a function that was not called, or was changed since",
        RUN_ALL,
    ),
    When.NEVER: (
        Severity.OBSERVATION, ": it stands in a branch that never runs",
        "take it out, or let it run",
    ),
    When.IDLE: (
        Severity.OBSERVATION, ": it stands in a loop that never runs", "take it out, or let it run",
    ),
}  # fmt: skip
"""What a line that the record does not hold means, by when its code is run."""
INPUTS = {
    "cover": "c_c", "spacing": "s_b", "superimposed": "q_SD", "partitions": "q_pt",
    "live_load": "q_L", "tributary_width": "b_tr", "snow": "q_S", "aggregate": "a_max",
    "floor_weight": "q_fl", "sustained": "r_Ls",
}  # fmt: skip
"""Inputs of a beam by the symbols of their lines, where these differ."""
_SHOWN = re.compile(r"\b([A-Za-z][A-Za-z0-9_]{0,39})\s*=\s*(-?\d{1,12}(?:\.\d{1,12})?)(?![\d.eE])")
_MOST_SHOWN = 200
_LONGEST_OUTPUT = 20_000
_LONGEST_OUTPUTS = 1_000_000


def stale(
    cells: Sequence[Cell], codes: Sequence[Code], scope: Scope | None, remarks: Iterable[str]
) -> Iterator[Finding]:
    """Give what shows that outputs are older than the cells and inputs above them."""
    code = [c for c in cells if c.kind == CODE and c.source.strip()]
    if code and not any(c.outputs or c.count is not None for c in code):
        yield finding(Severity.MAJOR, "the notebook has not been run: it holds no result",
                      advice=RUN_ALL)  # fmt: skip
        return
    told = " ".join(remarks)
    yield from _not_run(codes, told)
    yield from _order(code)
    yield from _set_later(codes)
    yield from _cleared(codes)
    yield from _printed(codes)
    if scope is not None:
        yield from _parameters(codes, scope)
        yield from _not_recorded(codes, scope)


def _not_run(codes: Sequence[Code], told: str) -> Iterator[Finding]:
    missing = [
        code.cell for code in codes
        if code.cell.count is None and (code.tree is None or code.tree.body)
    ]  # fmt: skip
    missing = [cell for cell in missing if f"{cell.name} " not in told]
    if missing:
        yield finding(
            Severity.MAJOR,
            f"{listed(cell.name for cell in missing)} "
            f"{'has' if len(missing) == 1 else 'have'} not been run as stored",
            advice=RUN_ALL,
        )


def _order(code: Sequence[Cell]) -> Iterator[Finding]:
    ran = [(cell, cell.count) for cell in code if cell.count is not None]
    turned = [
        f"{cell.name} (run as {count}) after {later.name} (run as {after})"
        for (cell, count), (later, after) in zip(ran[1:], ran, strict=False)
        if count < after
    ]
    if turned:
        yield finding(
            Severity.MINOR,
            f"the cells were not run from the top: {listed(turned, 3)}",
            advice=RUN_ALL,
        )


def _set_later(codes: Sequence[Code]) -> Iterator[Finding]:
    """Tell a cell that uses a name which a cell above it has set again since."""
    latest: dict[str, tuple[int, Cell]] = {}
    for code in codes:
        count = code.cell.count
        if code.tree is None or count is None:
            continue
        sets = _names(code, ast.Store)
        used = sorted((_names(code, ast.Load) - sets) & latest.keys())
        later = [(name, *latest[name]) for name in used if latest[name][0] > count]
        if later:
            _, when, above = later[0]
            names = [name for name, _, cell in later if cell is above]
            yield finding(
                Severity.MAJOR,
                f"{code.cell.name} was run (as {count}) before {above.name} (as {when}), which "
                f"sets {listed(names)}: its results are older than its inputs",
                advice=RUN_ALL,
            )
        for name in sets:
            if name not in latest or latest[name][0] < count:
                latest[name] = count, code.cell


def _names(code: Code, how: type[ast.expr_context]) -> set[str]:
    if code.tree is None:
        return set()
    nodes = (node for node in ast.walk(code.tree) if isinstance(node, ast.Name))
    return {node.id for node in nodes if isinstance(node.ctx, how)}


def _cleared(codes: Sequence[Code]) -> Iterator[Finding]:
    """Tell cells that show something when they are run, and show nothing as stored."""
    cleared = [
        code.cell.name for code in codes
        if code.cell.count is not None and not code.cell.outputs and _shows(code)
    ]  # fmt: skip
    if cleared:
        yield finding(
            Severity.MINOR,
            f"{listed(cleared)}: run, but without outputs; they were taken out",
            advice=RUN_ALL,
        )


def _shows(code: Code) -> bool:
    body = code.tree.body if code.tree is not None else []
    opens = any(m.method == "part" and m.when is When.ALWAYS for m in recorded(code))
    prints = any(
        isinstance(s, ast.Expr)
        and isinstance(s.value, ast.Call)
        and isinstance(s.value.func, ast.Name)
        and s.value.func.id == "print"
        for s in body
    )
    return opens or prints


def _printed(codes: Sequence[Code]) -> Iterator[Finding]:
    """Compare numbers that a cell printed with what its code gives as it stands."""
    left = _LONGEST_OUTPUTS
    for code, before, made in set_in_cells(codes):
        text = "\n".join(output[:_LONGEST_OUTPUT] for output in code.cell.outputs)[:left]
        left -= len(text)
        for name, number in _SHOWN.findall(text)[:_MOST_SHOWN]:
            values = _values_of(name, code, before, made)
            value = values[-1] if values else None
            if value is not None and not any(_agrees(number, each) for each in values):
                yield finding(
                    Severity.MAJOR,
                    f"{code.cell.name} shows {name} = {number}; its code as it stands gives "
                    f"{value:.6g}: the output is older than an input",
                    advice=RUN_ALL,
                )


def _values_of(
    name: str, code: Code, before: Mapping[str, float], made: Mapping[str, list[float | None]]
) -> list[float]:
    """Return all values that a name has where its cell may print it; none where one is unknown."""
    symbol = symbol_of(name)
    values = list(made.get(symbol, ()))
    if not values or _is_used_first(code, name):
        values.insert(0, before.get(symbol))
    known = [value for value in values if value is not None]
    return known if len(known) == len(values) else []


def _is_used_first(code: Code, name: str) -> bool:
    """Tell whether a cell uses a name above the line that sets it first."""
    nodes = [n for n in ast.walk(code.tree or ast.Module([], [])) if isinstance(n, ast.Name)]
    sets = [n.lineno for n in nodes if n.id == name and isinstance(n.ctx, ast.Store)]
    uses = [n.lineno for n in nodes if n.id == name and isinstance(n.ctx, ast.Load)]
    return bool(sets) and bool(uses) and min(uses) <= min(sets)


def _agrees(number: str, value: float) -> bool:
    """Tell whether a printed number is a value to its digits, in some unit of it."""
    shown = float(number)
    if shown == 0 or value == 0:
        return abs(shown - value) < 1e-6  # noqa: PLR2004 - nothing of either
    decimals = len(number.partition(".")[2])
    half = 0.5 * 10.0**-decimals
    ten = round(math.log10(abs(value / shown)))
    return any(abs(value / 10.0**power - shown) <= half * 1.001 for power in {0, ten})


# -- inputs against the record ---------------------------------------------------------------


def _parameters(codes: Sequence[Code], scope: Scope) -> Iterator[Finding]:
    """Compare the texts of the parameters cell with the givens of the record."""
    for code in codes:
        if PARAMETERS not in code.cell.tags:
            continue
        for made in assigned(code):
            symbol = INPUTS.get(made.name, made.symbol)
            nodes = [n for n in scope.by_symbol.get(symbol, ()) if n.kind == GIVEN]
            if not made.typed or len(nodes) != 1:
                continue
            node = nodes[0]
            value = _read(symbol, made.typed, node.unit)
            if value is not None and not close(value, node.stored):
                yield finding(
                    Severity.MAJOR,
                    f"{code.cell.name} says {made.name} = {made.typed!r}; the record was made with "
                    f"{node.entry['typed']} ({name_of(node)})",
                    [node.id],
                    advice=RUN_ALL,
                )


def _read(symbol: str, text: str, unit: str) -> float | None:
    try:
        return read_quantity(symbol, text, unit).value
    except UserError:
        return None


def _not_recorded(codes: Sequence[Code], scope: Scope) -> Iterator[Finding]:
    """Compare what the code records, as its text says, with what the record holds."""
    entries = scope.record.entries.values()
    formulas = {_tight(e["formula"]) for e in entries if e["kind"] in (LINE, *CRITERIA)}
    typed = {(e["symbol"], _tight(e["typed"])) for e in entries if e["kind"] == GIVEN}
    for made in (made for code in codes for made in recorded(code)):
        said = _missing(made, formulas, typed, scope.record.data["calc"])
        if said:
            severity, why, advice = _WHEN[made.when]
            yield finding(severity, f"{made.cell.name} {said}{why}", advice=advice)


def _missing(
    made: Recorded, formulas: set[str], typed: set[tuple[str, str]], calc: Mapping[str, Any]
) -> str:
    first = made.texts[0]
    shown = first if len(first) <= 80 else first[:79] + "…"  # noqa: PLR2004 - part of a line
    if made.method in ("open", "Sheet"):
        wrong = first != calc["id"] and "." not in first
        return f"opens {shown!r}; the record is of {calc['id']!r}" if wrong else ""
    if made.method == "given" and len(made.texts) > 1:
        symbol, text = made.texts[:2]
        if (symbol, _tight(text)) in typed:
            return ""
        return f"types {symbol[:40]} = {text[:40]!r}, which the record does not hold"
    compares = "<" in first or ">" in first
    if (made.method == "line" and "=" in first) or (
        made.method in ("check", "decide") and compares
    ):
        return "" if _tight(first) in formulas else f"records {shown!r}, which is not in the record"
    return ""


def _tight(text: str) -> str:
    return "".join(str(text).split())
