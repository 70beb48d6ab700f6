"""Beams for the tests: drawn whole, with cantilevers, columns and every kind of load."""

from __future__ import annotations

from dataclasses import replace

from hypothesis import settings
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

repeatable = settings(max_examples=60, deadline=None, derandomize=True, database=None)


@st.composite
def loads_on(draw: st.DrawFn, beam: Beam) -> list[Load]:
    """Draw one load a span and up to five more."""
    kinds = st.sampled_from(["D", "L", "S"])
    made: list[Load] = [
        UniformLoad(draw(kinds), number, draw(st.integers(1, 60)))
        for number in range(1, len(beam.spans) + 1)
    ]
    for _ in range(draw(st.integers(0, 5))):
        number = draw(st.integers(1, len(beam.spans)))
        length = beam.spans[number - 1].length
        a, b = sorted(draw(st.lists(st.integers(0, 20), min_size=2, max_size=2, unique=True)))
        if draw(st.booleans()):
            made.append(
                PointLoad(draw(kinds), number, draw(st.integers(-50, 200)) * 1e3, a / 20 * length)
            )
        else:
            made.append(
                PartialLoad(
                    draw(kinds), number, draw(st.integers(-9, 50)), a / 20 * length, b / 20 * length
                )
            )
    return made


@st.composite
def beams(draw: st.DrawFn) -> Beam:
    """Draw a stable beam of one to six spans."""
    count = draw(st.integers(1, 6))
    spans = tuple(
        Span(draw(st.integers(20, 120)) * 100.0, draw(st.integers(2, 40)) * 1e13)
        for _ in range(count)
    )
    simple, fixed, free = Support("simple", 300), Support("fixed", 200), Support("free")
    elastic = Support("elastic", 400, draw(st.integers(1, 500)) * 1e9)
    first, last = (draw(st.sampled_from([simple, fixed, elastic, free])) for _ in range(2))
    inner = [draw(st.sampled_from([simple, elastic])) for _ in range(count - 1)]
    supports = [first, *inner, last]
    held = [s for s in supports if s.kind != "free"]
    if not held or (len(held) == 1 and held[0].kind == "simple"):
        supports[0] = fixed
    return Beam(spans, tuple(supports))


def turned(beam: Beam, load: Load) -> Load:
    """Return a load as seen from the other side."""
    number = len(beam.spans) + 1 - load.span
    length = beam.spans[load.span - 1].length
    if isinstance(load, PointLoad):
        return replace(load, span=number, at=length - load.at)
    if isinstance(load, PartialLoad):
        return replace(load, span=number, start=length - load.end, end=length - load.start)
    return replace(load, span=number)
