"""Arrangements and combinations; all 2^n arrangements enumerated against the set of 9.2.3.1."""

from __future__ import annotations

import random

import numpy as np
import pytest

from lineproof.beams.analysis.arrangements import (
    Arrangement,
    Combination,
    cases_of,
    factored_combinations,
    service_combinations,
    standard_arrangements,
)
from lineproof.beams.analysis.model import FREE, SIMPLE, Beam, Span, Support, UniformLoad
from lineproof.beams.analysis.solve import Solution, solve
from lineproof.errors import UserError

from .solving import all_arrangements

LIVE_ONLY = Combination("1L", "", (("L", 1.0),))
FACTORED = (
    Combination("1.25D + 1.5L", "", (("D", 1.25), ("L", 1.5))),
    Combination("0.9D + 1.5L", "", (("D", 0.9), ("L", 1.5))),
)


def irregular(count: int) -> tuple[Span, ...]:
    pick = random.Random(count)  # noqa: S311 - repeatable, not secret
    return tuple(Span(pick.uniform(5000, 9500), pick.uniform(4, 12) * 1e13) for _ in range(count))


BEAMS = {
    **{f"{n} equal": Beam((Span(7600, 8e13),) * n, (SIMPLE,) * (n + 1)) for n in range(1, 7)},
    **{f"{n} irregular": Beam(irregular(n), (SIMPLE,) * (n + 1)) for n in range(3, 7)},
    "columns": Beam(irregular(4), (Support("elastic", 0, 4e10),) * 5),
    "overhangs": Beam(
        (Span(2000, 8e13), *irregular(3), Span(2500, 8e13)), (FREE, *[SIMPLE] * 4, FREE)
    ),
}  # fmt: skip


def solved(beam: Beam) -> Solution:
    loads = [
        UniformLoad(kind, n, w)
        for n in range(1, len(beam.spans) + 1)
        for kind, w in (("D", 8), ("L", 10))
    ]
    return solve(beam, loads)


def cases(
    solution: Solution, combinations: tuple[Combination, ...], arrangements: tuple[Arrangement, ...]
) -> Solution:
    return solution.combined(cases_of(solution.rows, combinations, arrangements).factors)


def span_moments(solution: Solution) -> list[float]:
    return [float(curves.moment_extremes().largest.max()) for curves in solution.spans]


def support_moments(solution: Solution) -> list[float]:
    sides = [(c.M0.min(), c.end_moment.min()) for c in solution.spans]
    return [float(moment) for pair in sides for moment in pair]


def sagging_at_supports(solution: Solution) -> list[float]:
    sides = [(c.M0.max(), c.end_moment.max()) for c in solution.spans]
    return [float(moment) for pair in sides for moment in pair]


@pytest.mark.parametrize("name", BEAMS)
def test_the_standard_set_gives_every_largest_span_moment(name: str) -> None:
    """Alternate spans: exact, against all 2^n."""
    solution = solved(BEAMS[name])
    count = len(solution.spans)
    standard = cases(solution, FACTORED, standard_arrangements(count))
    every = cases(solution, FACTORED, all_arrangements(count))
    assert span_moments(standard) == pytest.approx(span_moments(every), rel=1e-12, abs=1e-3)


@pytest.mark.parametrize("name", BEAMS)
def test_with_every_other_span_beyond_the_pair_support_moments_are_the_largest(name: str) -> None:
    solution = solved(BEAMS[name])
    count = len(solution.spans)
    wider = cases(solution, FACTORED, standard_arrangements(count, beyond=True))
    every = cases(solution, FACTORED, all_arrangements(count))
    assert support_moments(wider) == pytest.approx(support_moments(every), rel=1e-12, abs=1e-3)
    assert wider.reactions.max(axis=0) == pytest.approx(every.reactions.max(axis=0), rel=1e-12)


@pytest.mark.parametrize("name", [name for name, beam in BEAMS.items() if len(beam.spans) > 2])
def test_without_the_pair_the_bottom_is_pulled_and_the_support_lifted_the_most(name: str) -> None:
    """The spans that the wider pairs leave out: exact, against all 2^n.

    Of one and two spans they leave out none: dead load alone.
    """
    solution = solved(BEAMS[name])
    count = len(solution.spans)
    wider = cases(solution, FACTORED, standard_arrangements(count, beyond=True))
    every = cases(solution, FACTORED, all_arrangements(count))
    largest = pytest.approx(sagging_at_supports(every), rel=1e-12, abs=1e-3)
    assert sagging_at_supports(wider) == largest
    least = every.reactions.min(axis=0)
    assert wider.reactions.min(axis=0) == pytest.approx(least, rel=1e-12, abs=1e-6)


@pytest.mark.parametrize("name", BEAMS)
def test_the_standard_set_alone_is_a_subset_for_support_moments(name: str) -> None:
    """Exact up to three spans on simple supports; from four on up to 6 % short if they are equal.

    That is what 9.2.3.1 asks for; the wider set is there for who wants NBC 4.1.5.3 to the letter.
    """
    solution = solved(BEAMS[name])
    count = len(solution.spans)
    standard = np.array(support_moments(cases(solution, FACTORED, standard_arrangements(count))))
    every = np.array(support_moments(cases(solution, FACTORED, all_arrangements(count))))
    assert (standard >= every - 1e-3).all()
    if count <= 3:
        assert standard == pytest.approx(every, rel=1e-12, abs=1e-3)
    if name.endswith("equal"):
        assert (standard <= 0.94 * every + 1e-3).all()
    if name == "4 equal":
        assert (standard > 0.98 * every + 1e-3).any()


def test_the_shortfall_of_two_adjacent_spans_by_hand() -> None:
    """Four equal spans, live load only, three-moment equation in w l^2.

    4 M2 + M3 = -(q1 + q2)/4,  M2 + 4 M3 + M4 = -(q2 + q3)/4,  M3 + 4 M4 = -(q3 + q4)/4.
    Spans 1, 2, 4 loaded: M3 = -1/56, M2 = -(1/2 - 1/56)/4 = -27/224 = -0.1205.
    Spans 1, 2 loaded:    M3 = -2/56, M2 = -(1/2 - 2/56)/4 = -26/224 = -0.1161.
    """
    solution = solved(BEAMS["4 equal"])
    standard = cases(solution, (LIVE_ONLY,), standard_arrangements(4))
    wider = cases(solution, (LIVE_ONLY,), standard_arrangements(4, beyond=True))
    unit = 10 * 7600**2
    assert standard.span(1).end_moment.min() / unit == pytest.approx(-26 / 224, rel=1e-12)
    assert wider.span(1).end_moment.min() / unit == pytest.approx(-27 / 224, rel=1e-12)


def test_the_arrangements_themselves() -> None:
    assert [sorted(a.spans) for a in standard_arrangements(1)] == [[1]]
    assert [sorted(a.spans) for a in standard_arrangements(2)] == [[1, 2], [1], [2]]
    assert [sorted(a.spans) for a in standard_arrangements(4)] == [
        [1, 2, 3, 4], [1, 3], [2, 4], [1, 2], [2, 3], [3, 4],
    ]  # fmt: skip
    wider = {a.spans for a in standard_arrangements(6, beyond=True)}
    assert frozenset({1, 3, 4, 6}) in wider


def names(combinations: tuple[Combination, ...]) -> list[str]:
    return [c.name for c in combinations]


def test_factored_combinations_are_those_of_the_table() -> None:
    """NBC 2020, Table 4.1.3.2.-A, written out: cases 1 to 3 with and without companions."""
    assert names(factored_combinations(["L", "D", "S"])) == [
        "1.4D",
        "1.25D + 1.5L", "1.25D + 1.5L + 1.0S", "0.9D + 1.5L", "0.9D + 1.5L + 1.0S",
        "1.25D + 1.5S", "1.25D + 1.5S + 1.0L", "0.9D + 1.5S", "0.9D + 1.5S + 1.0L",
    ]  # fmt: skip


def test_live_load_of_storage_accompanies_with_a_half_more() -> None:
    """NBC 4.1.3.2: companion L plus 0.5 for storage: 1.5 in case 3, 1.0 in cases 4 and 5."""
    made = names(factored_combinations(["D", "L_st", "S", "W", "E"]))
    assert "1.25D + 1.5L (storage) + 1.0S" in made
    assert "0.9D + 1.5S + 1.5L (storage)" in made
    assert "1.25D + 1.4W + 1.0L (storage)" in made
    assert "1.0D + 1.0E + 1.0L (storage) + 0.25S" in made
    assert "1.25D + 1.5L (storage) + 0.4W" in made


def test_service_combinations() -> None:
    """NBC 2020, Table 4.1.3.4: companion L 0.35, of storage 0.5; companion S 0.35, W 0.3."""
    assert names(service_combinations(["D", "L", "S"])) == [
        "1.0D", "1.0D + 1.0L", "1.0D + 1.0L + 0.35S", "1.0D + 1.0S", "1.0D + 1.0S + 0.35L",
    ]  # fmt: skip
    assert "1.0D + 1.0S + 0.5L (storage)" in names(service_combinations(["D", "L_st", "S"]))
    assert "1.0D + 1.0W + 0.35L" in names(service_combinations(["D", "L", "W"]))


def test_an_unknown_load_type_is_refused() -> None:
    with pytest.raises(UserError) as caught:
        factored_combinations(["D", "Q", "X"])
    assert len(caught.value.faults) == 2
    assert "load type 'Q' has no factor" in caught.value.faults[0]


def test_only_live_load_is_arranged() -> None:
    rows = (("D", 1), ("D", 2), ("L", 1), ("L", 2), ("S", 1), ("S", 2))
    made = cases_of(rows, factored_combinations("DLS"), standard_arrangements(2))
    one = [str(name) for name in made.names].index("1.25D + 1.5L + 1.0S, live load on span 2")
    assert made.factors[one].tolist() == [1.25, 1.25, 0, 1.5, 1, 1]
    assert str(made.names[0]) == "1.4D"
    assert made.factors[0].tolist() == [1.4, 1.4, 0, 0, 0, 0]
    assert len({tuple(row) for row in made.factors.tolist()}) == len(made.names)
