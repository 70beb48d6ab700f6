"""The frame solution against tables, hand calculations and sympy's Beam."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from lineproof.beams.analysis.model import (
    FIXED,
    FREE,
    SIMPLE,
    Beam,
    Column,
    Load,
    PartialLoad,
    PointLoad,
    Span,
    Support,
    UniformLoad,
)
from lineproof.beams.analysis.solve import Solution, solve

from .random_beams import beams, loads_on, repeatable, turned
from .solving import largest_residual

L = 1000.0


def at(*stations: float) -> np.ndarray[tuple[int], np.dtype[np.float64]]:
    return np.array(stations, dtype=float)


def equal_spans(count: int) -> Solution:
    """Return count spans of 1000 mm under 1 N/mm each: wL = 1000 N, wL2 = 1e6 N.mm."""
    beam = Beam((Span(L, 1e12),) * count, (SIMPLE,) * (count + 1))
    return solve(beam, [UniformLoad("D", n, 1) for n in range(1, count + 1)]).total()


HICKS: dict[str, tuple[int, dict[str, float]]] = {
    "K1": (2, {"Msup1": -0.125, "Mspan1": 0.0703, "V1": 0.375, "V1r": 0.625, "x_max1": 0.375,
               "infl1": 0.75}),
    "K2": (3, {"Msup1": -0.1, "Mspan1": 0.08, "Mspan2": 0.025, "V1": 0.4, "V1r": 0.6, "V2": 0.5,
               "x_max1": 0.4, "infl1": 0.8, "infl2a": 0.276}),
    "K3": (4, {"Msup1": -0.107143, "Msup2": -0.071429, "Mspan1": 0.0772, "Mspan2": 0.0364,
               "V1": 0.392857, "V1r": 0.607143, "V2": 0.535714, "V2r": 0.464286, "x_max1": 0.393,
               "x_max2": 0.536, "infl1": 0.786, "infl2a": 0.266}),
    "K4": (5, {"Msup1": -0.105263, "Msup2": -0.078947, "Mspan1": 0.0779, "Mspan2": 0.0332,
               "Mspan3": 0.0461, "V1": 0.394737, "V1r": 0.605263, "V2": 0.526316, "V2r": 0.473684,
               "V3": 0.5, "x_max1": 0.395, "x_max2": 0.526, "infl1": 0.789, "infl2a": 0.268}),
}  # fmt: skip
"""T. G. Hicks, Civil Engineering Formulas (McGraw-Hill, 2002), Table 2.1, p. 50 (text opened)."""


def hicks_value(solution: Solution, name: str) -> float:
    number = int(next(c for c in name if c.isdigit()))
    curves = solution.span(number)
    extremes = curves.moment_extremes()
    if name.startswith("Msup"):
        return float(curves.end_moment[0]) / L**2
    if name.startswith("Mspan"):
        return float(extremes.largest[0]) / L**2
    if name.startswith("x_max"):
        return float(extremes.x_largest[0]) / L
    if name.startswith("infl"):
        return curves.inflections()[0] / L
    shear = -curves.end_shear if name.endswith("r") else curves.V0
    return float(shear[0]) / L


@pytest.mark.parametrize(
    ("case", "name"), [(case, name) for case, (_, values) in HICKS.items() for name in values]
)
def test_equal_spans_to_printed_digits(case: str, name: str) -> None:
    count, values = HICKS[case]
    printed = values[name]
    digits = len(f"{printed}".partition(".")[2])
    found = hicks_value(equal_spans(count), name)
    assert found == pytest.approx(printed, abs=0.5 * 10**-digits * (1 + 1e-9))


def test_k8_two_spans_with_a_point_load_and_a_uniform_load() -> None:
    """NPTEL, Structural Analysis I, Module 5, Lecture 4, Example 5.22 (loads inferred there)."""
    beam = Beam((Span(3000, 1e13),) * 2, (SIMPLE,) * 3)
    solved = solve(beam, [PointLoad("L", 1, 120e3, 1500), UniformLoad("L", 2, 40)]).total()
    assert solved.span(1).end_moment[0] / 1e6 == pytest.approx(-56.25, rel=1e-12)
    assert solved.reactions[0] / 1e3 == pytest.approx([41.25, 157.5, 41.25], rel=1e-12)


def test_n1_three_equal_spans() -> None:
    """sympy 1.14, class Beam, run against Hicks Table 2.1: R1 0.4 wL, R2 1.1 wL."""
    assert equal_spans(3).reactions[0] / L == pytest.approx([0.4, 1.1, 1.1, 0.4], rel=1e-12)


def test_n2_partial_load() -> None:
    """sympy 1.14 documentation, class Beam, first example: 4 m, 6 N/m from 2 to 4 m."""
    EI = 1e9  # N.mm2, 1e3 N.m2
    beam = Beam((Span(4000, EI),), (SIMPLE, SIMPLE))
    solved = solve(beam, [PartialLoad("L", 1, 0.006, 2000, 4000)]).total()
    assert solved.reactions[0] == pytest.approx([3, 9], rel=1e-12)
    assert EI / 1e6 * solved.rotations[0, 0] == pytest.approx(7, rel=1e-12)


# -- hand calculations --------------------------------------------------------------------------


def test_different_stiffness_by_the_three_moment_equation() -> None:
    """Two spans, uniform loads, EI unlike: with M_A = M_C = 0.

    Compatibility of the slopes at B:
    2 M_B (l_1/I_1 + l_2/I_2) = -w_1 l_1^3/(4 I_1) - w_2 l_2^3/(4 I_2).
    """
    l1, l2, w1, w2, EI1, EI2 = 6000.0, 9000.0, 20.0, 32.0, 4e13, 11e13
    beam = Beam((Span(l1, EI1), Span(l2, EI2)), (SIMPLE,) * 3)
    solved = solve(beam, [UniformLoad("D", 1, w1), UniformLoad("D", 2, w2)]).total()
    M_B = -(w1 * l1**3 / EI1 + w2 * l2**3 / EI2) / (8 * (l1 / EI1 + l2 / EI2))
    assert solved.span(1).end_moment[0] == pytest.approx(M_B, rel=1e-12)
    assert solved.span(2).M0[0] == pytest.approx(M_B, rel=1e-12)
    assert solved.reactions[0, 0] == pytest.approx(w1 * l1 / 2 + M_B / l1, rel=1e-12)


def test_columns_at_both_ends_by_slope_deflection() -> None:
    """One span between columns 4EI/l above and 3EI/l below.

    By symmetry theta_B = -theta_A, and
    M_A = -w l^2/12 + 2EI/l theta = -k theta, so theta = (w l^2/12)/(k + 2EI/l).
    """
    l, EI, w = 8000.0, 9e13, 25.0
    columns = [Column(3500, 2e13), Column(4000, 3e13, "pinned")]
    k = 4 * 2e13 / 3500 + 3 * 3e13 / 4000
    support = Support.columns(columns, 400)
    assert support.stiffness == pytest.approx(k, rel=1e-15)
    solved = solve(Beam((Span.of(l, 30e3, 3e9),), (support, support)), [UniformLoad("D", 1, w)])
    theta = w * l**2 / 12 / (k + 2 * EI / l)
    assert solved.rotations[0] == pytest.approx([theta, -theta], rel=1e-12)
    assert solved.couples[0] == pytest.approx([-k * theta, k * theta], rel=1e-12)


def test_a_column_between_two_spans_by_slope_deflection() -> None:
    """Only span 1 loaded, far ends simple.

    (3EI/l_1 + 3EI/l_2 + k) theta_B = -w l_1^2/8,
    M left of B = -w l_1^2/8 - 3EI/l_1 theta, right of B = 3EI/l_2 theta.
    """
    l1, l2, EI, w, k = 7000.0, 5000.0, 6e13, 30.0, 5e10
    beam = Beam((Span(l1, EI), Span(l2, EI)), (SIMPLE, Support("elastic", 0, k), SIMPLE))
    solved = solve(beam, [UniformLoad("L", 1, w)])
    theta = -w * l1**2 / 8 / (3 * EI / l1 + 3 * EI / l2 + k)
    left, right = -w * l1**2 / 8 - 3 * EI / l1 * theta, 3 * EI / l2 * theta
    assert solved.rotations[0, 1] == pytest.approx(theta, rel=1e-12)
    assert solved.span(1).end_moment[0] == pytest.approx(left, rel=1e-12)
    assert solved.span(2).M0[0] == pytest.approx(right, rel=1e-12)
    assert solved.couples[0, 1] == pytest.approx(-k * theta, rel=1e-12)
    assert right - left == pytest.approx(-k * theta, rel=1e-12)


@pytest.mark.parametrize("mirrored", [False, True])
def test_a_cantilever_alone(mirrored: bool) -> None:  # noqa: FBT001
    """Tip: w l^4/8EI + P l^3/3EI; root: -w l^2/2 - P l (any table of beams)."""
    l, EI, w, P = 2500.0, 4e13, 12.0, 30e3
    supports = (FREE, FIXED) if mirrored else (FIXED, FREE)
    loads: list[Load] = [UniformLoad("D", 1, w), PointLoad("D", 1, P, 0 if mirrored else l)]
    solved = solve(Beam((Span(l, EI),), supports), loads).total()
    tip, held_end = solved.span(1).deflection(at(*((0, l) if mirrored else (l, 0))))[0]
    assert tip == pytest.approx(w * l**4 / 8 / EI + P * l**3 / 3 / EI, rel=1e-12)
    assert held_end == pytest.approx(0, abs=1e-12)
    root = solved.span(1).moment(at(l if mirrored else 0))[0, 0]
    assert root == pytest.approx(-w * l**2 / 2 - P * l, rel=1e-12)
    held = 1 if mirrored else 0
    assert solved.reactions[0, held] == pytest.approx(w * l + P, rel=1e-12)
    assert abs(solved.couples[0, held]) == pytest.approx(w * l**2 / 2 + P * l, rel=1e-12)


def test_an_overhang_tip() -> None:
    """Load w on the overhang a only, span l: tip w a^3 (4 l + 3 a)/24EI, M_root -w a^2/2."""
    l, a, EI, w = 6000.0, 2000.0, 5e13, 18.0
    beam = Beam((Span(l, EI), Span(a, EI)), (SIMPLE, SIMPLE, FREE))
    solved = solve(beam, [UniformLoad("L", 2, w)]).total()
    tip = solved.span(2).deflection(at(a))[0, 0]
    assert tip == pytest.approx(w * a**3 * (4 * l + 3 * a) / 24 / EI, rel=1e-12)
    assert solved.span(1).end_moment[0] == pytest.approx(-w * a**2 / 2, rel=1e-12)
    assert solved.reactions[0, 0] == pytest.approx(-w * a**2 / 2 / l, rel=1e-12)


def test_a_simple_span_has_its_largest_deflection_at_the_exact_place() -> None:
    """5 w l^4/384EI at midspan; a point load at l/4: x from the far end sqrt((l2 - b2)/3).

    The curve is level there: its slope is small beside w l^3/24EI and P l^2/16EI, those of the end.
    """
    l, EI = 8000.0, 8e13
    beam = Beam((Span(l, EI),), (SIMPLE, SIMPLE))
    curves, x = solve(beam, [UniformLoad("D", 1, 20)]).span(1), at(l / 2)
    assert curves.deflection(x)[0, 0] == pytest.approx(5 * 20 * l**4 / 384 / EI, rel=1e-12)
    assert curves.slope(x)[0, 0] == pytest.approx(0, abs=1e-12 * 20 * l**3 / 24 / EI)
    P, b = 50e3, l / 4
    curves, x = solve(beam, [PointLoad("D", 1, P, b)]).span(1), at(l - ((l**2 - b**2) / 3) ** 0.5)
    most = P * b * (l**2 - b**2) ** 1.5 / (9 * 3**0.5 * l * EI)
    assert curves.deflection(x)[0, 0] == pytest.approx(most, rel=1e-12)
    assert curves.slope(x)[0, 0] == pytest.approx(0, abs=1e-12 * P * l**2 / 16 / EI)


def test_point_loads_of_two_load_types() -> None:
    loads = [PointLoad("D", 1, 82e3, 2000), PointLoad("L", 1, 60e3, 2000)]
    solved = solve(Beam((Span(8000, 8e13),), (SIMPLE, SIMPLE)), loads)
    assert solved.rows == (("D", 1), ("L", 1))
    # By moments about the right support: R = P (l - a)/l = 0.75 P.
    assert solved.reactions[:, 0] == pytest.approx([61.5e3, 45e3], rel=1e-12)
    assert solved.factored({"D": 1.25, "L": 1.5}).reactions[0, 0] == pytest.approx(
        144375, rel=1e-12
    )


def test_a_point_load_jumps_the_shear() -> None:
    curves = solve(
        Beam((Span(8000, 8e13),), (SIMPLE, SIMPLE)), [PointLoad("D", 1, 80e3, 2000)]
    ).span(1)
    assert curves.shear(at(2000), "left")[0, 0] == pytest.approx(60e3, rel=1e-12)
    assert curves.shear(at(2000), "right")[0, 0] == pytest.approx(-20e3, rel=1e-12)


# -- whatever is drawn ---------------------------------------------------------------------------


@repeatable
@given(st.data())
def test_equilibrium_and_compatibility_close(data: st.DataObject) -> None:
    beam = data.draw(beams())
    solved = solve(beam, data.draw(loads_on(beam)))
    for one in (solved, solved.total()):
        assert largest_residual(one) < 1e-12


@repeatable
@given(st.data())
def test_loads_superpose(data: st.DataObject) -> None:
    beam = data.draw(beams())
    loads = data.draw(loads_on(beam))
    apart = [solve(beam, [load]).total() for load in loads]
    whole = solve(beam, loads).total()
    for i, curves in enumerate(whole.spans):
        x = np.linspace(0, curves.length, 13)
        for what in ("moment", "shear", "deflection"):
            parts = [getattr(one.spans[i], what)(x) for one in apart]
            size = sum(np.abs(part).max() for part in parts)
            assert np.allclose(getattr(curves, what)(x), sum(parts), rtol=0, atol=1e-10 * size)


@repeatable
@given(st.data())
def test_the_mirrored_beam_gives_the_mirrored_curves(data: st.DataObject) -> None:
    beam = data.draw(beams())
    loads = data.draw(loads_on(beam))
    count = len(beam.spans)
    back = solve(Beam(beam.spans[::-1], beam.supports[::-1]), [turned(beam, o) for o in loads])
    one, other = solve(beam, loads).total(), back.total()
    assert one.reactions[0] == pytest.approx(other.reactions[0, ::-1], rel=1e-9, abs=1e-3)
    for number in range(1, count + 1):
        here, there = one.span(number), other.span(count + 1 - number)
        x = np.linspace(0, here.length, 13)
        for what, sign in (("moment", 1), ("deflection", 1), ("slope", -1)):
            first, second = getattr(here, what)(x), sign * getattr(there, what)(here.length - x)
            size = np.abs(first).max() + np.abs(second).max()
            assert np.allclose(first, second, rtol=0, atol=1e-8 * size + 1e-9)
        V, W = here.shear(x, "left"), -there.shear(here.length - x, "right")
        assert np.allclose(V[0, 1:], W[0, 1:], rtol=1e-9, atol=1e-3)


@repeatable
@given(st.data())
def test_extremes_bound_a_fine_walk(data: st.DataObject) -> None:
    beam = data.draw(beams())
    solved = solve(beam, data.draw(loads_on(beam))).total()
    for curves in solved.spans:
        x = np.linspace(0, curves.length, 401)
        found = curves.moment_extremes()
        M, size = curves.moment(x)[0], np.abs(curves.moment(x)).max() + 1
        assert M.max() <= found.largest[0] + 1e-9 * size
        assert M.min() >= found.smallest[0] - 1e-9 * size
        assert found.largest[0] == pytest.approx(
            curves.moment(found.x_largest)[0, 0], rel=1e-9, abs=1e-9 * size
        )
        signs = np.sign(np.where(np.abs(M) < 1e-7 * size, 0, M))
        changes = np.count_nonzero(np.diff(signs[signs != 0]))
        assert changes <= len(curves.inflections())
