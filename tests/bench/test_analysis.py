"""Growth of the analysis over the number of spans: solution, cases, pairs, governing values."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any

import pytest
from tests.beams.analysis.solving import largest_residual, solve_cases

from lineproof.beams.analysis.arrangements import factored_combinations, standard_arrangements
from lineproof.beams.analysis.envelope import Envelope, envelope, span_moment
from lineproof.beams.analysis.model import Beam, Load, PointLoad, Span, Support, UniformLoad
from lineproof.beams.analysis.solve import solve

LENGTHS = (7600.0, 9200.0, 7600.0)
SPANS = (1, 3, 6, 12, 24)


def beam_of(spans: int) -> tuple[Beam, list[Load]]:
    """Return a beam with dead and live load on every span and a girder's point load."""
    beam = Beam(
        tuple(Span(LENGTHS[n % 3], 8e13) for n in range(spans)),
        (Support("simple", 400),) * (spans + 1),
    )
    loads: list[Load] = []
    for number in range(1, spans + 1):
        loads += [UniformLoad("D", number, 30), UniformLoad("L", number, 24)]
        loads.append(PointLoad("D", number, 50e3, 3000))
    return beam, loads


def whole(beam: Beam, loads: list[Load]) -> Envelope:
    """Go from loads to governing values."""
    count = len(beam.spans)
    solved = solve_cases(
        solve(beam, loads), factored_combinations(["D", "L"]), standard_arrangements(count)
    )
    found = envelope(solved, [540.0] * count)
    for largest in (True, False):
        found.governing("M", largest=largest)
        found.governing("V", largest=largest)
    for number in range(1, count + 1):
        span_moment(solved, number)
    return found


@pytest.mark.benchmark(group="frame solution")
@pytest.mark.parametrize("spans", SPANS)
def test_solution(benchmark: Callable[..., Any], spans: int) -> None:
    beam, loads = beam_of(spans)
    assert largest_residual(benchmark(solve, beam, loads)) < 1e-12


@pytest.mark.benchmark(group="whole analysis")
@pytest.mark.parametrize("spans", SPANS)
def test_whole_analysis(benchmark: Callable[..., Any], spans: int) -> None:
    beam, loads = beam_of(spans)
    found = benchmark(whole, beam, loads)
    assert found.M.shape == (len(found.cases), len(found.stations))
