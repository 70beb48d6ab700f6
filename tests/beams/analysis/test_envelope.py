"""Pairs of M and V, governing values, reactions by load type, redistribution, coefficients."""

from __future__ import annotations

from dataclasses import replace

import numpy as np
import pytest
from hypothesis import assume, given
from hypothesis import strategies as st

from lineproof.beams.analysis.arrangements import (
    LoadCase,
    cases_of,
    factored_combinations,
    standard_arrangements,
)
from lineproof.beams.analysis.coefficients import NEGATIVE, POSITIVE, SHEAR, conditions, cross_check
from lineproof.beams.analysis.envelope import (
    CaseSolution,
    envelope,
    span_moment,
    stations_of,
)
from lineproof.beams.analysis.model import (
    FIXED,
    FREE,
    SIMPLE,
    Beam,
    Load,
    PartialLoad,
    PointLoad,
    Span,
    Support,
    UniformLoad,
)
from lineproof.beams.analysis.redistribution import redistribute
from lineproof.beams.analysis.solve import solve
from lineproof.errors import UserError

from .random_beams import beams, loads_on, repeatable
from .solving import largest_residual, solve_cases

WIDE = Support("simple", 400)
THREE = Beam((Span(7600, 8e13), Span(9200, 8e13), Span(7600, 8e13)), (WIDE,) * 4)
LOADS: list[Load] = []
for _span in (1, 2, 3):
    LOADS += [UniformLoad("D", _span, 30), UniformLoad("L", _span, 24)]
LOADS.append(PointLoad("D", 2, 50e3, 3000))


def three_spans() -> CaseSolution:
    combinations = factored_combinations(["D", "L"])
    return solve_cases(solve(THREE, LOADS), combinations, standard_arrangements(3))


def test_stations_hold_faces_d_v_and_both_sides_of_a_load() -> None:
    stations = stations_of(solve(THREE, LOADS), [540.0] * 3, pieces=4)
    second = [(s.x, s.side, s.marks) for s in stations if s.span == 2]
    assert second == [
        (0, "right", ("support",)),
        (200, "right", ("face",)),
        (740, "right", ("d_v",)),
        (2300, "right", ()),
        (3000, "left", ("load",)),
        (3000, "right", ("load",)),
        (4600, "right", ()),
        (6900, "right", ()),
        (8460, "right", ("d_v",)),
        (9000, "right", ("face",)),
        (9200, "left", ("support",)),
    ]


def test_a_free_end_has_no_face_and_a_support_without_width_is_its_own_face() -> None:
    beam = Beam((Span(2000, 8e13), Span(8000, 8e13)), (FREE, SIMPLE, WIDE))
    stations = stations_of(solve(beam, [UniformLoad("D", 1, 5)]), [300.0, 500.0], pieces=1)
    assert [(s.x, s.marks) for s in stations if s.span == 1] == [
        (0, ()),
        (1700, ("d_v",)),
        (2000, ("face", "support")),
    ]


@pytest.mark.parametrize("d_v", [[540.0], [540.0, 9000, 540], [0.0, 540, 540]])
def test_a_shear_depth_that_does_not_fit_is_refused(d_v: list[float]) -> None:
    with pytest.raises(UserError, match=r"^d_v: "):
        stations_of(solve(THREE, LOADS), d_v)
    with pytest.raises(UserError, match=r"^pieces: 0"):
        stations_of(solve(THREE, LOADS), pieces=0)


def test_pairs_are_of_one_case_and_equal_that_case_solved_alone() -> None:
    solved = three_spans()
    found = envelope(solved, [540.0] * 3)
    factors = cases_of(
        solve(THREE, LOADS).rows, factored_combinations("DL"), standard_arrangements(3)
    )
    place = next(i for i in found.marked("d_v", 2))
    station = found.stations[place]
    for (name, M, V), row in zip(found.pairs(place), factors.factors, strict=True):
        own = dict(zip(solve(THREE, LOADS).rows, row.tolist(), strict=True))
        scaled: list[Load] = [
            replace(load, P=load.P * own[load.kind, load.span])
            if isinstance(load, PointLoad)
            else replace(load, w=load.w * own[load.kind, load.span])
            for load in LOADS
        ]
        alone = solve(THREE, scaled).total().span(2)
        assert alone.moment(np.array([station.x]))[0, 0] == pytest.approx(M, rel=1e-10), name
        assert alone.shear(np.array([station.x]))[0, 0] == pytest.approx(V, rel=1e-10), name


def test_governing_values_name_their_case_and_carry_the_other_force() -> None:
    solved = three_spans()
    found = envelope(solved)
    for what in ("M", "V"):
        for largest in (True, False):
            for i, one in enumerate(found.governing(what, largest=largest)):
                pairs = {name: (M, V) for name, M, V in found.pairs(i)}
                mine, other = pairs[one.case] if what == "M" else pairs[one.case][::-1]
                assert (mine, other) == (one.value, one.beside)
                values = [p[0] if what == "M" else p[1] for p in pairs.values()]
                assert one.value == (max(values) if largest else min(values))


def test_the_governing_cases_of_three_spans_are_those_of_the_textbook() -> None:
    """Span moments by alternate spans, support moments by the two spans beside the support."""
    solved = three_spans()
    assert span_moment(solved, 1).case == LoadCase("1.25D + 1.5L", "live load on spans 1, 3")
    assert span_moment(solved, 2).case == LoadCase("1.25D + 1.5L", "live load on span 2")
    assert span_moment(solved, 2).beside == pytest.approx(0, abs=1e-6)
    found = envelope(solved)
    at_support = found.governing("M", largest=False)[found.marked("support", 2)[0]]
    assert at_support.case.arrangement == "live load on spans 1, 2"
    smallest = solved.solution.span(2).moment_extremes().smallest.min()
    assert at_support.value == pytest.approx(smallest, rel=1e-12)


def test_face_moments_are_less_than_at_the_axis() -> None:
    """M at the face: M_axis + V a - w a^2/2, a = half the width, all of one case."""
    solved = three_spans()
    found = envelope(solved)
    axis, face = found.marked("support", 2)[0], found.marked("face", 2)[0]
    w = solved.solution.span(2).w[:, 0]
    expected = found.M[:, axis] + found.V[:, axis] * 200 - w * 200**2 / 2
    assert found.M[:, face] == pytest.approx(expected, rel=1e-12)


# -- redistribution -------------------------------------------------------------------------------


def two_equal_spans() -> CaseSolution:
    solution = solve(
        Beam((Span(8000, 8e13),) * 2, (SIMPLE,) * 3),
        [UniformLoad("D", 1, 10), UniformLoad("D", 2, 10)],
    )
    return CaseSolution(solution.total(), (LoadCase("1D", ""),))


def test_redistribution_of_two_spans_by_hand() -> None:
    """wl^2/8 less 20 % is 0.1 wl^2; V_A = 0.5 - 0.1 = 0.4 wl; span 0.4^2/2 = 0.08 wl^2 at 0.4 l."""
    changed = redistribute(two_equal_spans(), {2: 20.0}, {2: 20.0}).solution
    unit = 10 * 8000**2
    assert changed.span(1).end_moment[0] / unit == pytest.approx(-0.1, rel=1e-12)
    assert changed.span(2).M0[0] / unit == pytest.approx(-0.1, rel=1e-12)
    found = changed.span(1).moment_extremes()
    assert found.largest[0] / unit == pytest.approx(0.08, rel=1e-12)
    assert found.x_largest[0] == pytest.approx(3200, rel=1e-12)
    assert changed.reactions[0] / 80e3 == pytest.approx([0.4, 1.2, 0.4], rel=1e-12)


@repeatable
@given(st.data())
def test_redistribution_keeps_statics(data: st.DataObject) -> None:
    """In every case: equilibrium as a whole, the given part at supports, loads untouched."""
    beam = data.draw(beams())
    chosen = {
        s: data.draw(st.integers(-20, 20))
        for s in range(2, len(beam.spans) + 1)
        if not (beam.cantilever(s - 1) or beam.cantilever(s))
    }
    assume(chosen)
    solution = solve(beam, data.draw(loads_on(beam)))
    before = solve_cases(
        solution, factored_combinations("DLS"), standard_arrangements(len(beam.spans))
    )
    after = redistribute(before, chosen, dict.fromkeys(chosen, 20.0))
    assert largest_residual(after.solution) < 1e-12
    for support, percent in chosen.items():
        for old, new in (
            (
                before.solution.span(support - 1).end_moment,
                after.solution.span(support - 1).end_moment,
            ),
            (before.solution.span(support).M0, after.solution.span(support).M0),
        ):
            kept = (old >= 0) & np.isclose(new, old, rtol=1e-9, atol=0.01)
            share = np.where(kept, 1.0, 1 - percent / 100)
            size = np.abs(old).max() + 1
            assert np.allclose(new, share * old, rtol=0, atol=1e-9 * size)
    for elastic, shifted in zip(before.solution.spans, after.solution.spans, strict=True):
        # The change of moment is a straight line: no load was added.
        x = np.array([0.0, elastic.length / 2, elastic.length])
        change = shifted.moment(x) - elastic.moment(x)
        size = np.abs(elastic.moment(x)).max() + 1
        assert np.allclose(
            change[:, 1], (change[:, 0] + change[:, 2]) / 2, rtol=0, atol=1e-9 * size
        )


@pytest.mark.parametrize(
    ("reductions", "limits", "words"),
    [
        ({2: 25.0}, {2: 20.0}, "25 % is more than the limit of 20 %; write at most that"),
        ({2: 10.0}, {2: 25.0}, "limit 25 % is outside 0 to 20 %"),
        ({2: 10.0}, {}, "no limit given"),
        ({1: 10.0}, {1: 20.0}, "the end is simple and carries no moment"),
        ({9: 10.0}, {9: 20.0}, "the beam has 4 supports"),
        ({2: float("nan")}, {2: 20.0}, "nan % is more than the limit"),
    ],
)
def test_redistribution_that_is_not_allowed(
    reductions: dict[int, float], limits: dict[int, float], words: str
) -> None:
    with pytest.raises(UserError) as caught:
        redistribute(three_spans(), reductions, limits)
    assert any(words in fault for fault in caught.value.faults)


def test_a_cantilever_moment_is_not_redistributed() -> None:
    for spans, supports, support in (
        ((Span(2000, 8e13), Span(8000, 8e13)), (FREE, SIMPLE, SIMPLE), 2),
        ((Span(2000, 8e13),), (FIXED, FREE), 1),
    ):
        solution = solve(Beam(spans, supports), [UniformLoad("D", 1, 10)]).total()
        with pytest.raises(UserError, match="follows from its load"):
            redistribute(
                CaseSolution(solution, (LoadCase("1D", ""),)), {support: 5.0}, {support: 9.0}
            )


def test_deflections_after_redistribution_are_refused() -> None:
    changed = redistribute(two_equal_spans(), {2: 10.0}, {2: 20.0}).solution
    with pytest.raises(UserError, match="elastic solution"):
        changed.span(1).deflection(np.array([4000.0]))


# -- coefficients ---------------------------------------------------------------------------------


def test_the_coefficients_themselves() -> None:
    """K12: Setareh and Darvas, Concrete Structures (Springer 2017), Table A2.1, p. 608."""
    assert {k: 1 / v for k, v in POSITIVE.items()} == pytest.approx(
        {"unrestrained": 0.09090909, "integral": 0.07142857, "interior": 0.0625}, rel=1e-6
    )
    assert {k: 1 / v for k, v in NEGATIVE.items()} == pytest.approx(
        {
            "first, two spans": 0.11111111, "first": 0.1, "other": 0.09090909,
            "spandrel": 0.04166667, "column": 0.0625,
        },
        rel=1e-6,
    )  # fmt: skip
    assert SHEAR == {"first": 1.15, "other": 1.0}


UNIFORM: list[Load] = LOADS[:6]
FACTORS = {"D": 1.25, "L": 1.5}


def test_cross_check_of_three_spans_by_hand() -> None:
    """w_f = 1.25 x 30 + 1.5 x 24 = 73.5; l_n = 7200 throughout (7600 less 400)."""
    beam = Beam((Span(7600, 8e13),) * 3, (WIDE,) * 4)
    solved = solve_cases(
        solve(beam, UNIFORM), factored_combinations("DL"), standard_arrangements(3)
    )
    found = cross_check(solved, UNIFORM, FACTORS)
    assert not found.failed
    rows = {(r.what, r.span, r.place): r for r in found.rows}
    w, l_n = 73.5, 7200.0
    expected = {
        ("positive", 1, "span"): w * l_n**2 / 11,
        ("positive", 2, "span"): w * l_n**2 / 16,
        ("negative", 1, "right face"): -w * l_n**2 / 10,
        ("negative", 2, "left face"): -w * l_n**2 / 11,
        ("shear", 1, "right face"): 1.15 * w * l_n / 2,
        ("shear", 1, "left face"): w * l_n / 2,
        ("shear", 2, "left face"): w * l_n / 2,
    }
    for key, value in expected.items():
        assert rows[key].by_coefficient == pytest.approx(value, rel=1e-12), key  # type: ignore[index]
    assert ("negative", 1, "left face") not in rows
    # Simple supports without columns bend more than the coefficients, made for frames, suppose.
    assert all(0.8 < row.ratio < 1.2 for row in found.rows)


def test_ends_held_by_columns_or_spandrels() -> None:
    column = Support("elastic", 400, 1e11)
    beam = Beam((Span(7600, 8e13),) * 2, (column, WIDE, column))
    solved = solve_cases(
        solve(beam, UNIFORM[:4]), factored_combinations("DL"), standard_arrangements(2)
    )
    rows = {
        (r.what, r.span, r.place): r.coefficient
        for r in cross_check(solved, UNIFORM[:4], FACTORS).rows
    }
    assert rows["positive", 1, "span"] == "1/14"
    assert rows["negative", 1, "left face"] == "1/16"
    assert rows["negative", 1, "right face"] == rows["negative", 2, "left face"] == "1/9"
    spandrel = cross_check(solved, UNIFORM[:4], FACTORS, ends=("spandrel", "column"))
    assert [r.coefficient for r in spandrel.rows if r.what == "negative"] == [
        "1/24",
        "1/9",
        "1/9",
        "1/16",
    ]


@pytest.mark.parametrize(
    ("beam", "loads", "words"),
    [
        (Beam((Span(8000, 8e13),), (WIDE,) * 2), UNIFORM[:2], "one span only"),
        (THREE, UNIFORM, "of spans 1 and 2 the longer is 1.21 times the shorter, more than 1.2"),
        (Beam((Span(8e3, 8e13), Span(8e3, 9e13)), (WIDE,) * 3), UNIFORM[:4], "EI is not the same"),
        (Beam((Span(8000, 8e13),) * 2, (WIDE, WIDE, FREE)), UNIFORM[:4], "span 2 is a cantilever"),
        (
            Beam((Span(8000, 8e13),) * 2, (WIDE,) * 3),
            [*UNIFORM[:4], PartialLoad("L", 2, 9, 0, 2000)],
            "the L load on span 2 is not uniform",
        ),
        (
            Beam((Span(8000, 8e13),) * 2, (WIDE,) * 3),
            [*UNIFORM[:4], UniformLoad("L", 2, 27)],
            "span 2: factored live load 76.5 N/mm is more than twice",
        ),
    ],
)  # fmt: skip
def test_the_condition_that_fails_is_named(beam: Beam, loads: list[Load], words: str) -> None:
    assert any(words in reason for reason in conditions(beam, loads, FACTORS))
    solved = solve_cases(
        solve(beam, loads), factored_combinations("DL"), standard_arrangements(len(beam.spans))
    )
    assert cross_check(solved, loads, FACTORS).rows == ()
