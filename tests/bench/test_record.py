"""Reading a record of some 5,000 lines, recomputing it, working it again from other inputs."""

from __future__ import annotations

from collections.abc import Callable
from functools import cache
from typing import Any

import pytest

from lineproof.audit.graph import Graph
from lineproof.record import Record, recompute

from .many_spans import whole

SPANS, LINES = 8, 4900
"""A beam of so many spans has at least so many lines."""


@cache
def text() -> str:
    """Return the record of the beam as text."""
    return whole(SPANS).to_text()


@pytest.mark.benchmark(group="record of 5,000 lines")
def test_reading(benchmark: Callable[..., Any]) -> None:
    """The text read and its form checked."""
    assert len(benchmark(Record.from_text, text()).entries) >= LINES


@pytest.mark.benchmark(group="record of 5,000 lines")
def test_recomputing(benchmark: Callable[..., Any]) -> None:
    """Every value, print and digest of a record that has been read."""
    assert benchmark(recompute, Record.from_text(text())) == []


@pytest.mark.benchmark(group="record of 5,000 lines")
def test_reading_and_recomputing(benchmark: Callable[..., Any]) -> None:
    """Both, as a checker does first."""
    assert benchmark(lambda: recompute(Record.from_text(text()))) == []


@pytest.mark.benchmark(group="record of 5,000 lines")
def test_working_again(benchmark: Callable[..., Any]) -> None:
    """All lines worked again from inputs that are one per cent larger."""
    graph = Graph(Record.from_text(text()))
    changed = {n.id: 1.01 * n.stored for n in graph if n.kind in ("given", "lookup")}
    assert len(benchmark(graph.worked, changed).values) == len(graph.stored)
