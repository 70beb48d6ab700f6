"""Cures of gaps by bars with which the shear leaves another tension: looked for anew.

A beam of 8.7 m on columns of 400 mm, 350 x 700 mm, 25 MPa, general method, no stirrups. By hand:

    w_f = 1.25*(24*0.35*0.7 + 3*(3.5 + 1.0)) + 1.5*3*2.4 = 24.225 + 10.8 = 35.025 kN/m
    at the face, 0.2 m: V_f = 35.025*(4.35 - 0.2) = 145.35 kN
    at d_v from it, 0.78 m: 125.0 kN

More bars leave less strain, hence a flatter angle, hence more tension by the same shear (11.3.9.2).
"""

from __future__ import annotations

import math
from typing import Any

import pytest

from lineproof.beams.continuous.cures_gaps import metres
from lineproof.sheet import Sheet

from .beam_with_gaps import EXISTING, cure, gaps_of, row
from .flow import CALLS, run, start

BEAM: dict[str, Any] = EXISTING | {
    "spans": ["8.7 m"], "supports": ["column 400 mm"] * 2, "h": "700 mm", "b_w": "350 mm",
    "f_c": "25 MPa", "floor_weight": "3.5 kPa", "live_load": "2.4 kPa", "shear_method": "general",
}  # fmt: skip
RUNS = [row("bottom", "2-25M", -0.1, 8.8), row("top", "2-15M", -0.1, 8.8)]
FURTHER = row("bottom", "4-25M", -0.15, 8.85, layer=2)
L_25 = 0.6 * 400 / 5 * 25.2  # 1209.6 mm


@pytest.fixture(scope="module")
def sheet() -> Sheet:
    """The sheet of the beam through its anchorage."""
    return run(start(**BEAM, bar_runs=RUNS), CALLS[:-2])


def angle(area: float) -> float:
    """Return 29 + 7000*V_f/(E_s*A_s) at 0.78 m, where M_f is less than V_f*d_v [deg]."""
    return 29 + 7000 * 125.0e3 / (200e3 * area)


def test_further_bars_ask_for_more_tension_than_those_there() -> None:
    """At the face 300 of 1209.6 mm of 2-25M and 350 of 4-25M: 826.7 mm2, 281 kN.

    At 0.78 m 880 and 930 mm of them: 2265 mm2, 30.9 degrees. At least V_f*cot(30.93) = 242 kN by
    the shear, 51 kN by 29.8 kN.m over 581 mm: 293 kN. With 2-25M alone, 35.0 degrees, it is 259.
    """
    beam = start(**BEAM, bar_runs=[*RUNS, FURTHER])
    run(beam, CALLS[:-2])
    (gap,) = (g for g in gaps_of(beam) if g.face == "bottom" and g.start < 4000)
    F_r = 0.85 * 400 * (1000 * 300 + 2000 * 350) / L_25
    assert gap.at.F_r == pytest.approx(F_r, rel=1e-9)
    theta = angle((1000 * 880 + 2000 * 930) / L_25)
    least = 145.35e3 / math.tan(math.radians(theta)) + 29.77e6 / 581.5
    assert least == pytest.approx(293.8e3, rel=1e-2)
    assert least > F_r
    asked = gap.at.F  # over two layers d_v is smaller
    assert asked == pytest.approx(least, rel=0.03)


def test_bars_that_would_leave_the_gap_so_are_not_told(sheet: Sheet) -> None:
    text = cure(sheet, "coverage-bottom-tension")
    assert "all loads, dead load too" in text
    assert "further bars 4-25M from −0.15 to 8.85 m" not in text


def test_places_are_told_to_the_mm_that_was_tried() -> None:
    assert [metres(x) for x in (18813.0, 3150.0, -100.0, 0.0)] == [
        "18.813", "3.15", "−0.10", "0.00",
    ]  # fmt: skip
