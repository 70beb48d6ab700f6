"""Auditing claims and reading a long record, against what a checker would do instead."""

from __future__ import annotations

from collections.abc import Callable, Mapping, Sequence
from functools import cache
from typing import Any

import pytest
import sympy
from tests.audit.planting import chosen, claims_of, sheet_with, written
from tests.audit.planting_slips import right_side
from tests.beams.continuous import flow

from lineproof.audit.claims.judge import judge
from lineproof.audit.data import Claim, Verdict
from lineproof.audit.graph import Graph
from lineproof.audit.slips.search import find_slips
from lineproof.record import Record, recompute

CLAIMS, ENTRIES = 500, 5000
LENGTHS = ("7.6 m", "9.2 m", "7.6 m")


def whole(spans: int) -> Record:
    """Design and record the gallery floor beam with so many spans."""
    return flow.record_of(
        spans=[LENGTHS[n % 3] for n in range(spans)],
        supports=["girder 400 mm", *["column 450 mm"] * (spans - 1), "girder 400 mm"],
    )


@cache
def three_spans() -> Graph:
    """The record of three spans as a graph."""
    return Graph(whole(3))


@cache
def junior() -> tuple[Claim, ...]:
    """Claims with three digits of 500 values of three spans, a slip of every kind among them."""
    graph = three_spans()
    sheet = sheet_with(graph, [slip for slip in chosen(graph, 1) if slip.written is None])
    needed = sheet.touched | {target for i in sheet.touched for target in graph.sources[i]}
    values = [node.id for node in graph if node.has_value]
    filled = [*(i for i in values if i in needed), *(i for i in values if i not in needed)]
    ids = sorted(filled[:CLAIMS], key=values.index)
    return tuple(claims_of(graph, written(sheet.values, sheet.planted), ids).values())


@pytest.mark.benchmark(group="audit of 500 claims")
def test_judged_with_slip_search(benchmark: Callable[..., Any]) -> None:
    """500 claims judged, the slip behind every origin sought; the goal is 1 s."""
    said = benchmark(judge, three_spans(), junior(), find_slips)

    origins = [found for found in said if found.verdict is Verdict.ORIGIN]
    benchmark.extra_info["origins"] = len(origins)  # type: ignore[attr-defined]
    assert len([found for found in said if found.claim]) == CLAIMS
    assert len(origins) >= 15
    assert any(found.slips for found in origins)


@pytest.mark.benchmark(group="audit of 500 claims")
def test_judged_alone(benchmark: Callable[..., Any]) -> None:
    """The same without looking for slips."""
    said = benchmark(judge, three_spans(), junior())

    assert [found for found in said if found.verdict is Verdict.ORIGIN] != []


@pytest.mark.benchmark(group="audit of 500 claims")
def test_worked_again_by_sympy(benchmark: Callable[..., Any]) -> None:
    """The lines among the 500 worked once from the claims by sympy, as one would in a notebook."""
    graph, claims = three_spans(), {claim.id: claim.value for claim in junior()}
    functions = {"cot": lambda x: sympy.cot(sympy.pi * x / 180), "min": sympy.Min, "max": sympy.Max}
    lines = [n for n in graph if n.id in claims and n.kind == "line"]
    lines = [n for n in lines if all(target in claims for target in n.args.values())]

    def each() -> Sequence[float]:
        found = []
        for node in lines:
            names: Mapping[str, Any] = {name: sympy.Symbol(name) for name in node.args}
            # the record's own formulas, checked when it was read
            expression = sympy.sympify(right_side(node), locals=functions | dict(names))
            values = {names[name]: claims[target] for name, target in node.args.items()}
            found.append(float(expression.subs(values)))
        return found

    assert len(benchmark.pedantic(each, rounds=3)) > CLAIMS / 3  # type: ignore[attr-defined]


@pytest.mark.benchmark(group="audit of 500 claims")
def test_designed_again(benchmark: Callable[..., Any]) -> None:
    """The whole beam designed and recorded again, as running its notebook does."""
    made = benchmark.pedantic(whole, (3,), rounds=3)  # type: ignore[attr-defined]

    assert made.digest == three_spans().record.digest


@cache
def long_text() -> str:
    """The text of a record of more than 5,000 lines: nine spans."""
    record = whole(9)
    assert len(record.entries) >= ENTRIES
    return record.to_text()


@pytest.mark.benchmark(group="record of 5000 lines")
def test_read_and_recomputed(benchmark: Callable[..., Any]) -> None:
    """A record read from its text, every line recomputed; the goal is 0.2 s."""
    text = long_text()

    def proved() -> int:
        record = Record.from_text(text)
        assert recompute(record) == []
        return len(record.entries)

    benchmark.extra_info["lines"] = benchmark(proved)  # type: ignore[attr-defined]
    assert benchmark.extra_info["lines"] >= ENTRIES  # type: ignore[attr-defined]


@pytest.mark.benchmark(group="record of 5000 lines")
def test_designed_again_at_nine_spans(benchmark: Callable[..., Any]) -> None:
    """The same beam designed and recorded again, as running its notebook does."""
    made = benchmark.pedantic(whole, (9,), rounds=1)  # type: ignore[attr-defined]

    assert made.to_text() == long_text()
