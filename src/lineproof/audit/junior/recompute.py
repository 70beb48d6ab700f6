"""A record worked again: the first line that is wrong, and what is only carried from it."""

from __future__ import annotations

from collections.abc import Container, Iterable, Iterator

from lineproof.audit.data import Finding, Severity
from lineproof.audit.graph import Graph, Node
from lineproof.audit.junior.scope import finding, name_of, printed
from lineproof.errors import UserError
from lineproof.quantity import read_quantity
from lineproof.quantity.units import internal_factor, system_unit
from lineproof.record import Record
from lineproof.record.entry import CHECK, GIVEN, LOOKUP
from lineproof.record.printed_checks import rounds_to
from lineproof.record.procedures import recall
from lineproof.record.recompute import Difference, close, recompute
from lineproof.sentences import listed
from lineproof.standards.catalogue import tables
from lineproof.typeset.values import told

_COMPARED = ("left side", "right side", "truth")


def recomputed(record: Record) -> Iterator[Finding]:
    """Give a finding per origin, with the lines that only carry it, then what is altered."""
    differences = recompute(record)
    again = {d.id: d for d in differences if d.what == "value"}
    graph = Graph(record)
    wrong = [node for node in graph if node.id in again and _is_wrong(node, graph)]
    older: dict[str, list[str]] = {}
    for node in graph:
        for target in _changed_below(node, graph):
            older.setdefault(target, []).append(node.id)
    stale = {entry_id for users in older.values() for entry_id in users}
    origins = [n for n in wrong if n.id not in stale]
    named = {node.id for node in origins}
    unknown = [node for node in origins if _is_unknown(node)]
    if unknown:
        yield _not_known(unknown)
    for node in origins:
        if node in unknown:
            continue
        carried = [i for i in graph.below([node.id]) if i in again and i not in named]
        yield _origin(node, again[node.id], older.get(node.id, []), carried)
    for target, users in older.items():
        if target not in named:
            yield _older(graph[target], users)
    told = named | older.keys() | set(graph.below(named | older.keys()))
    yield from _left([d for d in again.values() if d.id not in told])
    yield from _comparisons(differences, graph, told)
    yield from _prints([d for d in differences if d.id not in told])
    yield from _altered(differences)
    yield from _lookups(graph)


def _is_wrong(node: Node, graph: Graph) -> bool:
    """Tell whether a value does not follow from the very values that its line uses."""
    try:
        return not close(_own_value(node, graph), node.stored)
    except (ArithmeticError, ValueError, KeyError):
        return True


def _changed_below(node: Node, graph: Graph) -> list[str]:
    """Return what a line rests on that no longer has the value printed in its substitution."""
    printed = node.entry["printed"].get("args", {})
    system = node.entry.get("system", "N-mm")
    changed = []
    for name, text in printed.items():
        target = graph[node.args[name]]
        unit = system_unit(target.unit, system)
        if not rounds_to(text, target.stored / internal_factor(unit)):
            changed.append(target.id)
    return changed


def _own_value(node: Node, graph: Graph) -> float:
    if node.kind == GIVEN:
        return read_quantity(node.symbol, node.entry["typed"], node.unit).value
    if node.kind == LOOKUP:
        shown = node.entry["printed"]
        return float(shown["result"]) * internal_factor(shown["unit"])
    return node.compute(graph.named(node, graph.stored))


def _is_unknown(node: Node) -> bool:
    made = node.entry.get("procedure")
    return made is not None and recall(made["name"], made["version"]) is None


def _not_known(nodes: list[Node]) -> Finding:
    procedures = dict.fromkeys(
        f"{n.entry['procedure']['name']} of version {n.entry['procedure']['version']}"
        for n in nodes
    )  # fmt: skip
    return finding(
        Severity.MAJOR,
        f"{listed(name_of(node) for node in nodes)} cannot be worked again: "
        f"{listed(procedures, 3)} is not known here",
        [node.id for node in nodes],
        advice="audit it with the version that made it, or confirm the closing criterion by hand",
    )


def _origin(node: Node, difference: Difference, users: list[str], carried: list[str]) -> Finding:
    stored = told(f"{node.entry['value']:.10g}", node.unit)
    follows = f"; {listed(carried)} follow from it" if carried else ""
    if users:
        follows += f"; {listed(users)} {'was' if len(users) == 1 else 'were'} worked with another"
    ids = dict.fromkeys([node.id, *users, *carried])
    gives = difference.recomputed
    if gives.startswith("failed"):
        reason = gives.removeprefix("failed: ")[:120]
        return finding(
            Severity.MAJOR,
            f"{name_of(node)}: the recorded {stored} cannot be worked again ({reason}){follows}",
            ids,
            advice="work the line by hand, or with the version that made the record",
        )
    source = {GIVEN: "was typed", LOOKUP: "is printed"}.get(node.kind)
    gives = told(gives, node.unit)
    why = f"{gives} {source}" if source else f"its formula and the values that it uses give {gives}"
    return finding(
        Severity.CRITICAL,
        f"{name_of(node)}: recorded as {stored}, but {why}{follows}",
        ids,
        str(node.entry["clause"]),
        "the record was changed by hand or made by another version: issue the calculation again",
    )


def _older(node: Node, users: list[str]) -> Finding:
    were = "was" if len(users) == 1 else "were"
    return finding(
        Severity.CRITICAL,
        f"{name_of(node)}: {printed(node)} stands here, but {listed(users)} {were} worked with "
        "another value: the line was changed after them",
        [node.id, *users],
        str(node.entry["clause"]),
        "ask which value holds, and run the calculation again",
    )


def _left(left: Iterable[Difference]) -> Iterator[Finding]:
    held = list(left)
    if held:
        yield finding(
            Severity.MAJOR,
            f"{listed(map(str, held), 3)}: they differ when all is worked again from the givens",
            [difference.id for difference in held],
        )


def _comparisons(
    differences: Iterable[Difference], graph: Graph, told: Container[str]
) -> Iterator[Finding]:
    """Tell checks whose recorded truth is wrong, and sides that differ with nothing above them."""
    turned = {d.id for d in differences if d.what == "truth"}
    for difference in differences:
        node = graph.nodes.get(difference.id)
        if node is None or difference.what not in _COMPARED:
            continue
        if difference.what == "truth":
            kind = "check" if node.kind == CHECK else "comparison"
            said = "holds" if difference.stored == "True" else "does not hold"
            yield finding(
                Severity.CRITICAL,
                f"{name_of(node)}: the record says that the {kind} {said}; worked again it is the "
                "reverse",
                [node.id],
                str(node.entry["clause"]),
                "do not rely on the conclusion printed there",
            )
        elif node.id not in told and node.id not in turned:
            yield finding(
                Severity.MAJOR,
                f"{name_of(node)}: the {difference.what} is recorded as {difference.stored}, its "
                f"own values give {difference.recomputed}",
                [node.id],
            )


def _prints(differences: Iterable[Difference]) -> Iterator[Finding]:
    other = [
        d for d in differences
        if d.what not in ("value", *_COMPARED, "digest") and d.id != "record"
    ]  # fmt: skip
    if other:
        yield finding(
            Severity.MAJOR,
            f"{listed(map(str, other), 3)}: what is printed is not what is recorded",
            dict.fromkeys(d.id for d in other),
            advice="issue the calculation again",
        )


def _altered(differences: list[Difference]) -> Iterator[Finding]:
    ids = [d.id for d in differences if d.what == "digest"]
    if ids:
        yield finding(
            Severity.MAJOR,
            f"{ids[0]}: its text is not that of which the record was made"
            + (f"; so it is for {len(ids) - 1} lines after it" if len(ids) > 1 else ""),
            ids,
            advice="ask who changed it, and issue the calculation again",
        )
    heads = [d for d in differences if d.id == "record"]
    if heads:
        yield finding(
            Severity.MAJOR,
            f"record: {listed((f'{d.what} stored {d.stored[:60]}' for d in heads), 3)}: not what "
            "its lines give",
            advice="issue the calculation again",
        )


def _lookups(graph: Graph) -> Iterator[Finding]:
    """Compare what was read off a table with the table."""
    known = {table.name: table for _, table in tables()}
    for node in graph:
        table = known.get(node.entry.get("table", "")) if node.kind == LOOKUP else None
        if table is None:
            continue
        row = table.rows.get(node.entry["row"], {})
        numbers = [(n, table.columns[c]) for c, n in row.items() if _fits(node, table.columns[c])]
        values = [float(number) * internal_factor(unit) for number, unit in numbers]
        if node.symbol in row:
            values = [float(row[node.symbol]) * internal_factor(table.columns[node.symbol])]
        if not any(close(value, node.stored) for value in values):
            there = f"the table has {listed(n for n, _ in numbers)}" if row else "no such row"
            yield finding(
                Severity.CRITICAL,
                f"{name_of(node)}: {told(node.entry['printed']['result'], node.unit)} is not "
                f"what the table {table.name!r} holds at {node.entry['row']!r}: {there}",
                [node.id],
                str(node.entry["clause"]),
                "read the table again",
            )


def _fits(node: Node, unit: str) -> bool:
    try:
        read_quantity(node.symbol, f"1 {unit}".strip(), node.unit)
    except UserError:
        return False
    return True
