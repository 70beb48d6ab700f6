"""Axes: round ticks, true places, labels kept apart."""

from __future__ import annotations

from itertools import pairwise

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from lineproof.drawing import Circle, Line
from lineproof.drawing.axes import (
    UNSEEN,
    Axes,
    curve,
    drop_lines,
    frame,
    level,
    nice_ticks,
    spread,
    thinned,
    tick_texts,
)
from lineproof.drawing.shapes import Text, words

AXES = Axes(20.0, 10.0, 100.0, 50.0, (0.0, 1.0), (0.0, 1000.0))


@pytest.mark.parametrize(
    ("low", "high", "ticks"),
    [
        (0.0, 930.0, (0.0, 200.0, 400.0, 600.0, 800.0, 1000.0)),
        (0.0, 1.0, (0.0, 0.2, 0.4, 0.6, 0.8, 1.0)),
        (0.0, 0.0035, (0.0, 0.001, 0.002, 0.003, 0.004)),
        (-12.0, 30.0, (-20.0, -10.0, 0.0, 10.0, 20.0, 30.0)),
    ],
)
def test_nice_ticks(low: float, high: float, ticks: tuple[float, ...]) -> None:
    """Ticks are round and cover the range."""
    assert nice_ticks(low, high) == pytest.approx(ticks)


@pytest.mark.parametrize(("low", "high"), [(1.0, 1.0), (2.0, 1.0), (0.0, float("inf"))])
def test_ticks_need_a_range(low: float, high: float) -> None:
    """An empty or endless range is refused."""
    with pytest.raises(ValueError, match="rising order"):
        nice_ticks(low, high)


def test_tick_texts() -> None:
    """Decimals follow the step; minus is a true minus; five digits are grouped."""
    assert tick_texts((0.0, 0.25, 0.5)) == ("0.00", "0.25", "0.50")
    assert tick_texts((-10.0, 5000.0, 20000.0)) == ("−10", "5000", "20\u2009000")


def test_values_stand_at_their_places() -> None:
    """A curve, a level and the drop lines of a point use one linear map."""
    path = curve(AXES, [(0.0, 0.0), (0.5, 500.0)], "dashed")
    line = level(AXES, 700.0, "long")
    *drops, dot = drop_lines(AXES, (0.25, 800.0))

    assert path.points == ((20.0, 10.0), (70.0, 35.0))
    assert (line.start, line.end) == ((20.0, 45.0), (120.0, 45.0))
    assert isinstance(dot, Circle)
    assert dot.centre == (45.0, 50.0)
    assert [drop.end for drop in drops if isinstance(drop, Line)] == [(45.0, 10.0), (20.0, 50.0)]


HEIGHTS = st.one_of(st.floats(-50, 50), st.floats(-UNSEEN, UNSEEN))


@given(heights=st.lists(HEIGHTS, min_size=1, max_size=40))
def test_a_curve_loses_only_points_that_cannot_be_seen(heights: list[float]) -> None:
    """All points left out lie on the line through the others, by numpy.interp."""
    points = [(0.5 * place, y) for place, y in enumerate(heights)]
    kept = thinned(points)

    assert set(kept) <= set(points)
    assert (kept[0], kept[-1]) == (points[0], points[-1])
    again = np.interp([x for x, _ in points], *np.array(kept).T)
    assert np.abs(again - heights).max() <= UNSEEN * (1 + 1e-9)


def test_steps_and_corners_of_a_curve_stay() -> None:
    """Bars that start to count: level, a step at one place, level again, a corner."""
    corners = [(0.0, 1.0), (4.0, 1.0), (4.0, 2.0), (8.0, 2.0), (9.0, 5.0)]
    between = [(1.0, 1.0), (3.0, 1.0), (5.0, 2.0), (7.0, 2.0), (8.5, 3.5)]
    # Sorting by the place alone keeps both ends of the step in their order.
    assert thinned(sorted([*corners, *between], key=lambda point: point[0])) == corners


def test_frame_prints_every_tick() -> None:
    """Each tick has its number and both labels are there."""
    shapes = frame(AXES, (0.0, 0.5, 1.0), (0.0, 1000.0), words("x"), words("y"))
    texts = ["".join(run for run, _ in s.runs) for s in shapes if isinstance(s, Text)]

    assert texts == ["0.0", "0.5", "1.0", "0", "1000", "x", "y"]


@pytest.mark.parametrize(
    "levels", [[10.0, 11.0], [30.0, 29.9, 30.1], [0.0, 0.0, 0.0], [49.0, 50.0], [5.0, 25.0]]
)
def test_spread_keeps_order_gap_and_bounds(levels: list[float]) -> None:
    """Labels come apart by the gap, stay between the bounds and keep their order."""
    placed = spread(levels, 4.0, 0.0, 50.0)
    rising = [y for _, y in sorted(zip(levels, placed, strict=True))]

    assert all(high - low >= 4.0 - 0.01 for low, high in pairwise(rising))
    assert min(placed) >= 0.0
    assert max(placed) <= 50.0
    if levels == [5.0, 25.0]:
        assert placed == levels
