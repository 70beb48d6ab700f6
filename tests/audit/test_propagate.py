"""What follows from rounded numbers: correlated, curved, at corners; against every end by force."""

from __future__ import annotations

import itertools
import math
import random

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from tests.audit.hand import beam, sheet_of, typed

from lineproof.audit.claims.propagate import Form, Function, Worker, claimed_form, combined
from lineproof.audit.data import Interval
from lineproof.audit.graph import Graph

X = claimed_form("x", Interval(9.0, 11.0))
Y = claimed_form("y", Interval(4.0, 6.0))


def ends(form: Form) -> tuple[float, float]:
    return form.interval.low, form.interval.high


def test_what_rests_on_the_same_number_moves_together() -> None:
    """u = 2x - 3, v = 2x + 3: v - u is 6 whatever x is, u + v = 4x is 36 to 44."""
    below = combined(lambda x: 2 * x - 3, [X])
    above = combined(lambda x: 2 * x + 3, [X])
    assert ends(combined(lambda u, v: v - u, [below, above])) == (6.0, 6.0)
    assert ends(combined(lambda u, v: u + v, [below, above])) == (36.0, 44.0)


@pytest.mark.parametrize(
    ("function", "low", "high"),
    [
        (lambda x, y: x + y, 13.0, 17.0),
        (lambda x, y: x * y, 36.0, 66.0),
        (lambda x, y: x / y, 9 / 6, 11 / 4),
        (max, 9.0, 11.0),
        (lambda x, y: min(x, 2 * y), 8.0, 11.0),
        (lambda x, y: math.sqrt(x) * y**2, 3 * 16, math.sqrt(11) * 36),
    ],
)
def test_the_ends_of_functions_lie_inside(function: Function, low: float, high: float) -> None:
    """The exact ends are found at corners; a kink at the middle may widen them by half."""
    got = ends(combined(function, [X, Y]))
    assert got[0] <= low + 1e-9
    assert got[1] >= high - 1e-9
    assert got[1] - got[0] <= 1.55 * (high - low)


@settings(max_examples=200, deadline=None, derandomize=True, database=None)
@given(
    seed=st.integers(0, 10**6), coarse=st.sampled_from([0.05, 0.005, 0.0005]),
)  # fmt: skip
def test_no_choice_of_values_leaves_the_interval(seed: int, coarse: float) -> None:
    """Random chains of three steps on three numbers: every end against every end stays inside."""
    draw = random.Random(seed)  # noqa: S311 - a test's own numbers
    middles = [draw.uniform(1, 10) for _ in range(3)]
    steps = [draw.choice(_STEPS) for _ in range(3)]
    forms = [
        claimed_form(str(i), Interval(m * (1 - coarse), m * (1 + coarse)))
        for i, m in enumerate(middles)
    ]
    interval = _chain(steps, forms)
    for signs in itertools.product((-1, 0, 1), repeat=3):
        values = [m * (1 + coarse * sign) for m, sign in zip(middles, signs, strict=True)]
        exact = steps[0](values[0], values[1])
        exact = steps[2](steps[1](exact, values[2]), exact)
        assert interval.holds(exact)


_STEPS: list[Function] = [
    lambda a, b: a * b, lambda a, b: a + b, lambda a, b: a / (1 + b), max,
    lambda a, b: min(a, 2 * b), lambda a, b: a**2 + b, lambda a, b: math.sqrt(abs(a + b)),
    lambda a, b: abs(a - b), lambda a, b: a - b / 3,
]  # fmt: skip


def _chain(steps: list[Function], forms: list[Form]) -> Interval:
    first = combined(lambda a, b: float(steps[0](a, b)), forms[:2])
    second = combined(lambda a, b: float(steps[1](a, b)), [first, forms[2]])
    return combined(lambda a, b: float(steps[2](a, b)), [second, first]).interval


def test_an_end_outside_of_what_a_formula_takes_is_left_out() -> None:
    """The root of x - 9 with x from 8 to 12: 1 at the middle, and up to sqrt(3)."""
    form = combined(lambda x: math.sqrt(x - 9), [claimed_form("x", Interval(8.0, 12.0))])
    assert form.interval.holds(1.0)
    assert form.interval.high == pytest.approx(math.sqrt(3))
    with pytest.raises(ValueError, match=r"nonneg|math domain"):
        combined(lambda x: math.sqrt(x - 9), [claimed_form("x", Interval(7.0, 8.0))])


def test_a_world_as_claimed() -> None:
    """d = 539 +- 0.5: a does not rest on it, M_r = 408 000 (d - a/2) moves by 0.204 kN.m."""
    graph = Graph(beam())
    claim = typed(graph, "beam/d", "539")
    world = Worker(graph).world({"beam/d": claimed_form("beam/d", claim.stands_for)})
    assert world.follows["beam/d"].interval == Interval(538.95, 538.95)
    assert world.used["beam/d"].interval == Interval(538.5, 539.5)
    assert world.used["beam/a"] == Form(graph.stored["beam/a"])
    resistance = world.used["strength/M_r"]
    assert resistance.half == pytest.approx(408_000 * 0.5)
    assert resistance.middle == pytest.approx(408_000 * (539 - 64.97850 / 2), rel=1e-6)


def test_rounding_that_cancels_along_lines_that_nobody_claimed() -> None:
    """d claimed 539 +- 0.5: u = h - d, v = u + d is h whatever d is."""
    lines = {"d = h - c_c - d_bs - d_b/2": "mm", "u = h - d": "mm", "v = u + d": "mm"}
    graph = Graph(sheet_of(lines).close())
    claim = typed(graph, "beam/d", "539")
    world = Worker(graph).world({"beam/d": claimed_form("beam/d", claim.stands_for)})
    assert world.used["beam/u"].half == 0.5
    assert world.used["beam/v"].interval == Interval(600.0, 600.0)


def test_a_world_from_another_works_only_what_differs() -> None:
    graph = Graph(beam())
    worker = Worker(graph)
    base = worker.world({})
    other = worker.world({"given/w_f": Form(50.0)}, base=base)
    assert other.used["strength/M_f"].middle == pytest.approx(50 * 6000**2 / 8)
    assert base.used["strength/M_f"].middle == pytest.approx(40 * 6000**2 / 8)
    assert other.used["strength/M_r"] is base.used["strength/M_r"]
    assert worker.world({"given/w_f": Form(50.0)}).used == other.used


def test_decisions_that_turn() -> None:
    graph = Graph(beam("a <= h_f"))
    worker = Worker(graph)
    assert worker.world({"beam/a": Form(99.0)}).turned == frozenset()
    turned = worker.world({"beam/a": Form(101.0)})
    assert turned.turned == {"strength/branch"}
    assert worker.world({"beam/a": Form(99.0)}, base=turned).turned == frozenset()
