"""Statics and symmetry of whatever is drawn, added up here from the loads alone."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from lineproof.beams.analysis.model import (
    Beam,
    Load,
    PartialLoad,
    PointLoad,
    Span,
    Support,
    UniformLoad,
)
from lineproof.beams.analysis.solve import Solution, solve

from .random_beams import beams, loads_on, repeatable, turned


def resultants(beam: Beam, loads: list[Load], up_to: float) -> list[tuple[float, float]]:
    """Return (force, place) of the loads left of a station, each cut off there."""
    made = []
    for load in loads:
        start = beam.axes[load.span - 1]
        if isinstance(load, PointLoad):
            if start + load.at < up_to:
                made.append((load.P, start + load.at))
            continue
        first, last = start, beam.axes[load.span]
        if isinstance(load, PartialLoad):
            first, last = start + load.start, start + load.end
        last = min(last, up_to)
        if last > first:
            made.append((load.w * (last - first), (first + last) / 2))
    return made


def moment_by_cut(solved: Solution, loads: list[Load], station: float) -> tuple[float, float]:
    """Return the moment of all forces left of a station, and the sum of their sizes."""
    beam = solved.beam
    held = [
        (float(R), float(C), x)
        for R, C, x in zip(solved.reactions[0], solved.couples[0], beam.axes, strict=True)
        if x < station
    ]
    up = [(R * (station - x), C) for R, C, x in held]
    down = [P * (station - x) for P, x in resultants(beam, loads, station)]
    size = sum(abs(a) + abs(b) for a, b in up) + sum(map(abs, down))
    return sum(a + b for a, b in up) - sum(down), size


@repeatable
@given(st.data())
def test_reactions_carry_the_loads(data: st.DataObject) -> None:
    """Forces and moments about the right end, from the reactions, the couples and the loads."""
    beam = data.draw(beams())
    loads = data.draw(loads_on(beam))
    solved = solve(beam, loads).total()
    whole = resultants(beam, loads, np.inf)
    size = sum(abs(P) for P, _ in whole)
    assert abs(solved.reactions[0].sum() - sum(P for P, _ in whole)) <= 1e-9 * size
    end = beam.axes[-1]
    turning = sum(R * (end - x) for R, x in zip(solved.reactions[0], beam.axes, strict=True))
    turning += solved.couples[0].sum() - sum(P * (end - x) for P, x in whole)
    assert abs(turning) <= 1e-9 * size * end


@repeatable
@given(st.data())
def test_moments_are_those_of_the_part_on_the_left(data: st.DataObject) -> None:
    """M at stations of every span, by cutting the beam there."""
    beam = data.draw(beams())
    loads = data.draw(loads_on(beam))
    solved = solve(beam, loads).total()
    for number, start in enumerate(beam.axes[:-1], start=1):
        curves = solved.span(number)
        for share in (0.137, 0.5, 0.861):
            expected, size = moment_by_cut(solved, loads, start + share * curves.length)
            found = curves.moment(np.array([share * curves.length]))[0, 0]
            assert found == pytest.approx(expected, rel=1e-9, abs=1e-10 * size)


def symmetric(beam: Beam) -> Beam:
    """Return the beam and its mirror image joined at their inner supports."""
    outer = beam.supports[:-1]
    middle = Support("fixed" if all(s.kind == "free" for s in outer) else "simple", 300)
    supports = (*outer, middle, *outer[::-1])
    return Beam((*beam.spans, *beam.spans[::-1]), supports)


@repeatable
@given(st.data())
def test_a_symmetric_beam_under_symmetric_loads(data: st.DataObject) -> None:
    """Reactions and moments are the same from both sides; the middle support does not turn."""
    half = data.draw(beams())
    beam = symmetric(half)
    loads = data.draw(loads_on(half))
    solved = solve(beam, [*loads, *(turned(beam, load) for load in loads)]).total()
    reactions = solved.reactions[0]
    size = np.abs(reactions).max()
    assert np.allclose(reactions, reactions[::-1], rtol=0, atol=1e-8 * size)
    middle = len(half.spans)
    largest = np.abs(solved.rotations[0]).max()
    assert abs(solved.rotations[0, middle]) <= 1e-8 * largest + 1e-15
    count = len(beam.spans)
    for number in range(1, middle + 1):
        here, there = solved.span(number), solved.span(count + 1 - number)
        x = np.linspace(0, here.length, 9)
        M, W = here.moment(x)[0], there.moment(here.length - x)[0]
        assert np.allclose(M, W, rtol=0, atol=1e-8 * np.abs(M).max() + 1e-3)


@repeatable
@given(st.data())
def test_deflections_are_reciprocal(data: st.DataObject) -> None:
    """Maxwell: a load at one place deflects another as much as it would the other way round."""
    beam = data.draw(beams())
    places = [
        (number, data.draw(st.integers(1, 19)) / 20 * beam.spans[number - 1].length)
        for number in (data.draw(st.integers(1, len(beam.spans))) for _ in range(2))
    ]
    (a, at_a), (b, at_b) = places
    one = solve(beam, [PointLoad("L", a, 50e3, at_a)]).total()
    other = solve(beam, [PointLoad("L", b, 50e3, at_b)]).total()
    there = one.span(b).deflection(np.array([at_b]))[0, 0]
    here = other.span(a).deflection(np.array([at_a]))[0, 0]
    own = one.span(a).deflection(np.array([at_a]))[0, 0]
    assert there == pytest.approx(here, rel=1e-7, abs=1e-9 * abs(own))


def test_a_symmetric_beam_by_hand() -> None:
    """Two spans of 6 m, 20 kN/m: reactions 3/8, 10/8, 3/8 of 120 kN = 45, 150, 45 kN."""
    half = Beam((Span(6000, 8e13),), (Support("simple"), Support("simple")))
    solved = solve(symmetric(half), [UniformLoad("D", 1, 20), UniformLoad("D", 2, 20)]).total()
    assert solved.reactions[0] / 1e3 == pytest.approx([45, 150, 45], rel=1e-12)
