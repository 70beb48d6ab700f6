"""A beam of several spans: its design with the record, its package, and the memory they take."""

from __future__ import annotations

import subprocess
import sys
from collections.abc import Callable
from pathlib import Path
from typing import Any

import pytest

from lineproof.notebook.read import read_calc
from lineproof.package import build_package, to_html, to_pdf

from .many_spans import CALCS, CHAPTERS, before_chapters, recorded, whole

DEMO = CALCS / "floor-beam.ipynb"
SPANS = (1, 3, 6, 12, 24)
FEW_ROUNDS = 12
"""Spans from which on one round is enough to see the growth."""
MEMORY_GOAL = 300
"""Peak memory of the design of three spans with its record and its package, MB."""
PEAK = """
import resource, sys
from pathlib import Path

def peak():
    status = Path("/proc/self/status")
    if status.exists():  # of this process alone; getrusage counts the one it was forked from
        line = next(x for x in status.read_text().splitlines() if x.startswith("VmHWM"))
        return int(line.split()[1]) / 1024
    most = resource.getrusage(resource.RUSAGE_SELF).ru_maxrss
    return most / 1024 ** (2 if sys.platform == "darwin" else 1)

from many_spans import whole
assert whole(3).data["parts"]
print(peak())
from lineproof.notebook.read import read_calc
from lineproof.package import build_package, to_html, to_pdf
calc = read_calc(Path({demo!r}))
package = build_package([calc.record], [calc.walk])
assert to_pdf(package).startswith(b"%PDF")
assert to_html(package).startswith("<!DOCTYPE html>")
print(peak())
"""


@pytest.mark.benchmark(group="three spans, step by step")
def test_design_alone(benchmark: Callable[..., Any]) -> None:
    """Bars and stirrups chosen, nothing recorded of them."""

    def design() -> int:
        beam = before_chapters(3)[1]
        for chapter in CHAPTERS[:3]:
            getattr(beam, chapter)()
        return len(beam.design.runs)

    assert benchmark(design) > 0


@pytest.mark.benchmark(group="three spans, step by step")
def test_all_chapters(benchmark: Callable[..., Any]) -> None:
    """The design with every line recorded, the sheet still open."""
    assert benchmark(lambda: len(recorded(3).parts)) > 0


@pytest.mark.benchmark(group="three spans, step by step")
def test_record_closed(benchmark: Callable[..., Any]) -> None:
    """The same, its digits chosen and its digests made."""
    assert benchmark(lambda: whole(3)).data["digest"]


@pytest.mark.benchmark(group="whole design with record, by number of spans")
@pytest.mark.parametrize("spans", SPANS)
def test_growth(benchmark: Callable[..., Any], spans: int) -> None:
    """The whole design with its record over the number of spans."""
    rounds = 3 if spans < FEW_ROUNDS else 1
    made = benchmark.pedantic(whole, (spans,), rounds=rounds, warmup_rounds=1)  # type: ignore[attr-defined]
    assert f"span-{spans}" in [part["key"] for part in made.data["parts"]]


@pytest.mark.benchmark(group="package of three spans")
def test_package_pdf(benchmark: Callable[..., Any]) -> None:
    """The stored calculation to the PDF of its package, drawings and working included, warm."""
    calc = read_calc(DEMO)

    def issue() -> bytes:
        return to_pdf(build_package([calc.record], [calc.walk]))

    issue()  # fonts and templates are read once
    assert benchmark(issue).startswith(b"%PDF")


@pytest.mark.benchmark(group="package of three spans")
def test_package_html(benchmark: Callable[..., Any]) -> None:
    """The stored calculation to the HTML of its package, warm."""
    calc = read_calc(DEMO)

    def issue() -> str:
        return to_html(build_package([calc.record], [calc.walk]))

    issue()
    assert benchmark(issue).startswith("<!DOCTYPE html>")


@pytest.mark.benchmark(group="peak memory of design and record, then of the package")
def test_peak_memory(benchmark: Callable[..., Any]) -> None:
    """Design and record, then PDF and HTML, in one fresh process; peaks stand beside the time."""
    program = PEAK.format(demo=str(DEMO))

    def run() -> str:
        return subprocess.run(
            [sys.executable, "-c", program], check=True, capture_output=True, text=True,
            cwd=Path(__file__).parent,
        ).stdout  # fmt: skip

    design, package = map(float, benchmark.pedantic(run, rounds=1).split())  # type: ignore[attr-defined]
    benchmark.extra_info["MB"] = {"design": round(design), "package": round(package)}  # type: ignore[attr-defined]
    assert design < package <= MEMORY_GOAL
