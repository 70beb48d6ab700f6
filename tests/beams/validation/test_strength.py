"""The strengths predicted for tests: by hand and by scipy, apart from the package's formulas."""

from __future__ import annotations

import math
from collections.abc import Callable

import pytest
from scipy.optimize import brentq

from lineproof.beams.validation import procedures
from lineproof.beams.validation.data import cases
from lineproof.beams.validation.figure import RatioPoint, ratio_figure
from lineproof.beams.validation.strength_tests import (
    SHEAR_TESTS,
    record_bending_tests,
    record_model,
    record_shear_tests,
)
from lineproof.beams.validation.study import validation_study
from lineproof.drawing import Circle, Text
from lineproof.sheet import Sheet

D_V, E_S = 411.3, 200000.0  # max(0.9 x 457, 0.72 x 552) = max(411.3, 397.4)
PROJECT = {"codes": {"pair": "NBC 2015 + A23.3-14"}}


@pytest.fixture(scope="module")
def sheet() -> Sheet:
    made = Sheet("V1", project=PROJECT)
    validation_study(made)
    record_model(made, "1.0", "1.0")
    record_shear_tests(made)
    record_bending_tests(made)
    return made


def facts(name: str) -> dict[str, float]:
    return {symbol: float(typed.split()[0]) for symbol, typed in cases()[name].given.items()}


def area(x: dict[str, float]) -> float:
    return x["n_30"] * 700 + x["n_25"] * 500


def root(unbalanced: Callable[[float], float]) -> float:
    return float(brentq(unbalanced, 1.0, 1e7, xtol=1e-6))


def test_oa1_without_stirrups_by_hand() -> None:
    """V = k/(1 + m V) is a quadratic: V = (sqrt(1 + 4 k m) - 1)/(2 m).

    With M = V (1830 - 411.3), eps_x = V x 1830/411.3/(2 x 200000 x 2400), so
    m = 1500 x 1830/(411.3 x 2 x 200000 x 2400) = 6.9521e-6 per N;
    s_ze = 35 x 411.3/(15 + 20) = 411.3, so k = 0.40 x 1300/1411.3 x sqrt(22.6) x 305 x 411.3
    = 0.368455 x 4.75395 x 125446.5 = 219733 N; 4 k m = 6.11043;
    V = (2.666539 - 1)/1.390420e-5 = 119859 N.
    """
    found = procedures.STRENGTH[False].function(
        305.0, D_V, 22.6, 1.0, 1.0, E_S, 2400.0, 1830.0, D_V
    )
    assert found == pytest.approx(119859, abs=5)


@pytest.mark.parametrize("name", SHEAR_TESTS)
def test_shear_strength_by_scipy(sheet: Sheet, name: str) -> None:
    """11.3.4, 11.3.5 and 11.3.6.4 written out, the root by brentq."""
    x = facts(name)
    A_s = area(x)

    def unbalanced(V: float) -> float:
        eps = V * ((x["l_v"] - D_V) / D_V + 1) / (2 * E_S * A_s)
        beta = 0.40 / (1 + 1500 * eps)
        if "A_v" not in x:
            return beta * 1300 / (1000 + D_V) * math.sqrt(x["f_c"]) * x["b_w"] * D_V - V
        cot = 1 / math.tan(math.radians(29 + 7000 * eps))
        V_s = x["A_v"] * x["f_yt"] * D_V * cot / x["s"]
        return beta * math.sqrt(x["f_c"]) * x["b_w"] * D_V + V_s - V

    found = sheet.entry(f"{cases()[name].key}/V_n").value
    assert found == pytest.approx(root(unbalanced), rel=1e-9)


@pytest.mark.parametrize("name", SHEAR_TESTS)
def test_moment_resistance_by_scipy(sheet: Sheet, name: str) -> None:
    """Equilibrium of block and bars written out, the bars elastic up to their mean yield."""
    x = facts(name)
    A_s = area(x)
    f_y = (x["n_30"] * 700 * 436 + x["n_25"] * 500 * 440) / A_s
    block = (0.85 - 0.0015 * x["f_c"]) * x["f_c"] * x["b_w"]
    beta_1 = 0.97 - 0.0025 * x["f_c"]

    def tension(c: float) -> float:
        return A_s * min(f_y, E_S * 0.0035 * (457 - c) / c)

    c = root(lambda c: block * beta_1 * c - tension(c))
    M_r = tension(c) * (457 - beta_1 * c / 2)
    key = cases()[name].key
    assert sheet.entry(f"{key}/M_r").value == pytest.approx(M_r, rel=1e-6)
    V_n = sheet.entry(f"{key}/V_n").value
    predicted = min(V_n, M_r / x["l_v"])
    assert sheet.entry(f"{key}/V_p").value == pytest.approx(predicted, rel=1e-6)
    P = float(cases()[name].published["P_te"].number)
    ratio = sheet.entry(f"{key}/r_{name.removeprefix('G2-')}").value
    assert ratio == pytest.approx(P * 1e3 / 2 / predicted, rel=1e-6)


def test_c2_does_not_yield(sheet: Sheet) -> None:
    """2400 mm2 at 437.7 MPa in 152 mm: c/d 0.66 by strains, above 700/(700 + 437.7) = 0.615."""
    c = sheet.entry("case-g2-c2/c_l").value
    assert c / 457 > 700 / (700 + 437.67)


@pytest.mark.parametrize("name", ["C4-1", "C4-2", "C4-3"])
def test_bending_strength_by_scipy(sheet: Sheet, name: str) -> None:
    """Both layers at their strains, displaced concrete taken off bars in compression."""
    x = facts(name)
    stress = (0.85 - 0.0015 * x["f_c"]) * x["f_c"]
    beta_1 = 0.97 - 0.0025 * x["f_c"]

    def bar(A: float, d: float, c: float) -> float:
        strain = 0.0035 * (d - c) / c
        return A * (max(-x["f_y"], min(x["f_y"], E_S * strain)) + (stress if d < c else 0.0))

    def unbalanced(c: float) -> float:
        bars = bar(x["A_s"], x["d"], c) + bar(x["A_sp"], x["d_p"], c)
        return stress * x["b"] * beta_1 * c - bars

    c = root(unbalanced)
    moment = bar(x["A_s"], x["d"], c) * x["d"] + bar(x["A_sp"], x["d_p"], c) * x["d_p"]
    moment -= stress * x["b"] * (beta_1 * c) ** 2 / 2
    assert sheet.entry(f"{cases()[name].key}/M_r").value == pytest.approx(moment, rel=1e-6)


def test_the_upper_bars_of_the_first_pair_are_in_tension(sheet: Sheet) -> None:
    """157.2 x 575 = 90.4 kN against 0.775 x 50 x 150 x 0.845 x 25 = 122.8 kN of block at 25 mm."""
    taken = {name: sheet.entries_of(f"case-c4-{name}") for name in "123"}
    assert [bool(taken[name]["upper-bars-in-compression"]) for name in "123"] == [
        False, True, True,
    ]  # fmt: skip
    assert taken["1"]["c_l"].value < 25


def test_the_figure_shows_every_test_inside_its_field() -> None:
    points = [RatioPoint(f"B{n}", 0.8 + 0.1 * n, "a" if n < 3 else "b") for n in range(6)]
    figure = ratio_figure(points, [("a", 0.9), ("b", 1.2)])
    marks = [shape for shape in figure.shapes if isinstance(shape, Circle)]
    heights = [mark.centre[1] for mark in marks]
    assert heights == sorted(heights)
    assert len(set(heights)) == 6
    assert [mark.fill for mark in marks] == ["white"] * 3 + ["black"] * 3
    texts = [shape for shape in figure.shapes if isinstance(shape, Text)]
    shown = {"".join(words for words, _ in text.runs) for text in texts}
    assert {point.name for point in points} | {"mean 0.90", "mean 1.20", "1.30"} <= shown
    for x, y in (*(mark.centre for mark in marks), *(text.at for text in texts)):
        assert 0 < x < figure.width
        assert 0 < y < figure.height
    assert all(f"{point.name} {point.ratio:.2f}" in figure.alt for point in points)
