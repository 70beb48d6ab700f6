"""Given bars that leave gaps: printed, failing where they are, with cures that hold.

An existing beam of two spans of 6 m on walls and a column, 400 x 500 mm, 30 MPa, 400R, stirrups
below the minimum. Bottom bars 4-20M stop at 2.30 m and begin again at 3.00 m; the top bars 3-25M
over the column reach 0.90 m to each side of its axis, where 2-15M follow. By hand:

    w_D = 24*0.4*0.5 + 3*(4.0 + 1.0) = 19.8 kN/m, w_L = 3*4.8 = 14.4 kN/m
    w_f = 1.25*19.8 + 1.5*14.4 = 24.75 + 21.6 = 46.35 kN/m

Live load on span 1 (the moment at the column by load on one of two spans is w*l**2/16):

    M_B = -(24.75*6**2/8 + 21.6*6**2/16) = -(111.375 + 48.6) = -159.975 kN.m
    V_A = 46.35*6/2 - 159.975/6 = 139.05 - 26.6625 = 112.3875 kN
    largest moment at 112.3875/46.35 = 2.425 m: 112.3875**2/(2*46.35) = 136.26 kN.m
"""

from __future__ import annotations

import math
from typing import Any

import pytest

from lineproof.beams.continuous.cures_tried import failing
from lineproof.record.recompute import recompute
from lineproof.sheet import Sheet

from .beam_with_gaps import (
    BESIDE,
    D_BOTTOM,
    D_TOP,
    L_20,
    L_25_TOP,
    LEFT,
    OVER,
    RIGHT,
    STRESS,
    Existing,
    built,
    cure,
    gaps_of,
    row,
)
from .flow import CALLS, close_anyway, run, start

STATIONS = 5700 / 999
"""Distance of the stations at which the bars are looked at [mm], 1000 between face and axis."""
ROUND = 1.0
"""Stations lie on whole mm."""


COT = 1 / math.tan(math.radians(35))


def shown(length: float) -> float:
    """A length needed as it is printed and taken at a section: to 0.1 mm, upwards."""
    return math.ceil(10 * length) / 10


def moment(area: float, d: float) -> float:
    """M_r of bars in the web [N.mm], by a rectangular block."""
    force = 0.85 * 400 * area
    return force * (d - force / (STRESS * 400) / 2)


def near(value: float) -> Any:
    """A place found on the stations."""
    return pytest.approx(value, abs=STATIONS + ROUND)


def test_the_gap_at_midspan_is_where_the_hand_calculation_has_it(existing: Existing) -> None:
    """The tension there is capped by that of the largest moment alone (11.3.9.4).

    M = 136.26 kN.m needs 0.85*400*A = 321.9 kN: A = 946.7 mm2 of the 1200 mm2; the bars count as
    946.7/1200 = 0.789 of them 0.789*683.6 = 539.3 mm from their ends.
    """
    (gap,) = (g for g in gaps_of(existing[0]) if g.face == "bottom" and 1000 < g.start < 5000)
    M = 112.3875e3**2 / (2 * 46.35)
    force = STRESS * 400 * (D_BOTTOM - math.sqrt(D_BOTTOM**2 - 2 * M / (STRESS * 400)))
    lost = force / (0.85 * 400) / 1200 * L_20
    assert lost == pytest.approx(539.3, abs=0.1)
    assert (gap.start, gap.end) == (near(2300 - lost), near(3000 + lost))
    for x in (2300 - lost, 3000 + lost):  # at both ends the tension with shear is over its cap
        M_x = 112.3875e3 * x - 46.35 * x * x / 2
        V_x = abs(112.3875e3 - 46.35 * x)
        assert M_x / (0.9 * D_BOTTOM) + V_x * COT > force
    assert gap.worst == math.inf
    assert gap.at.M_r == 0
    assert gap.at.M_f == pytest.approx(136.26e6, rel=1e-4)
    assert gap.at.x == near(2425)


def test_no_resistance_is_printed_where_no_bars_stand(existing: Existing) -> None:
    """Of the section of the largest moment, and of the station at the gap."""
    _, sheet, record = existing
    for key in ("sag-1/strength", "coverage-bottom/strength"):
        part, name = key.split("/")
        M_f, M_r = sheet.entries_of(part)[name].value
        assert (M_f, M_r) == (pytest.approx(136.26e6, rel=1e-4), 0.0)
        assert key in record.failed
    title = (sheet.entries_of("coverage-bottom")["strength"].extra or {})["title"]
    assert title == "Gap in the bottom bars, span 1, 1.77 to 3.54 m from its left axis"
    needed = sheet.entries_of("sag-1")["A_sr"].value
    assert needed == pytest.approx(946.7, abs=0.1)
    rows = record.entries["summary/service"]["rows"]
    (whole,) = (r for r in rows if r[0] == "span 1" and "where no bars count" in r[1])
    assert whole[2:] == ["22.7 kN·m", "0 kN·m", "FAILS"]  # 50.1 less 27.4, see below; no ratio
    assert recompute(record) == []


def test_bars_too_short_count_as_far_as_they_are_developed(existing: Existing) -> None:
    """At the axis of the column 900 of 1435.5 mm: 0.627*1500 = 940.4 mm2, M_r = 134.5 kN.m.

    Both spans loaded: M_B = -46.35*6**2/8 = -208.6 kN.m, 174.8 kN.m at the face of the column.
    The section with all its bars would hold: 1500 mm2 give 206.8 kN.m.
    """
    beam, sheet, record = existing
    over = [g for g in gaps_of(beam) if g.face == "top"]
    assert [(g.span, g.start if g.span == 2 else g.end) for g in over] == [(1, 6000.0), (2, 6000.0)]
    rows = record.entries["coverage/stations"]["rows"]
    (at_face,) = (r for r in rows if r[:2] == ["1", "5.800"])
    share = 700 / shown(L_25_TOP) * 1500  # at the face the bars end 700 mm away
    assert float(at_face[5]) == pytest.approx(174.8, abs=0.5)
    assert float(at_face[6]) == pytest.approx(moment(share, D_TOP) / 1e6, abs=0.5)
    assert moment(900 / L_25_TOP * 1500, D_TOP) == pytest.approx(134.5e6, rel=1e-3)
    assert moment(1500, D_TOP) > 174.8e6
    for face in ("hog-2-left", "hog-2-right"):
        M_f, M_r = sheet.entries_of(face)["strength"].value
        assert M_f == pytest.approx(174.8e6, rel=1e-3)
        assert M_r == pytest.approx(moment(share, D_TOP), rel=1e-9)  # 106.0 kN.m
        assert f"{face}/strength" in record.failed
    assert sheet.entries_of("hog-2-left-developed")["A_sd"].value == pytest.approx(share, rel=1e-9)
    table = record.entries["summary/flexure"]["rows"]
    assert [r[5:] for r in table if r[0].startswith("support 2")] == [
        ["731", "106", "1.65 FAILS"]
    ] * 2  # fmt: skip
    assert {"coverage-top/strength", "coverage-gap-5/strength"} <= set(record.failed)


def test_the_gap_over_the_column_begins_where_the_thin_bars_do_not_carry_the_tension(
    existing: Existing,
) -> None:
    """2-15M, all developed there, carry 0.85*400*400 = 136 kN.

    Live load on span 2: V_A = 24.75*3 - 26.6625 = 47.5875 kN, and with d_v = 0.9*446.1 = 401.5 mm
    -(47.5875*x - 12.375*x**2)/0.4015 + (24.75*x - 47.5875)*cot(35) = 136 at x = 4.254 m.
    """
    (gap,) = (g for g in gaps_of(existing[0]) if g.face == "top" and g.span == 1)
    a, b = 12.375 / 0.40149, 47.5875 / 0.40149
    p, q = 24.75 * COT - b, -47.5875 * COT - 136
    x = (-p + math.sqrt(p * p - 4 * a * q)) / (2 * a)
    assert x == pytest.approx(4.254, abs=0.001)
    assert gap.start == near(1000 * x)


def test_short_bars_at_the_wall_fail_by_their_tension(existing: Existing) -> None:
    """At the face of the wall: 16.34/0.404 + (112.39 - 6.95)*cot(35) = 191.0 kN.

    The bars end 250 mm from it: 250/683.6 of 1200 mm2 carry 0.85*400*438.9 = 149.2 kN. Of all
    loads 149.2/191.0 = 78 % would do.
    """
    beam, sheet, _ = existing
    first = gaps_of(beam)[0]
    assert (first.span, first.start) == (1, 150.0)
    F_f, F_r = sheet.entries_of("coverage-gap-1")["bars-tension-side"].value
    M, V = 112.3875e3 * 150 - 46.35 * 150**2 / 2, 112.3875e3 - 46.35 * 150
    assert F_f == pytest.approx(M / (0.9 * D_BOTTOM) + V * COT, rel=1e-3)
    assert F_r == pytest.approx(0.85 * 400 * 1200 * 250 / L_20, rel=1e-3)
    assert "all loads, dead load too, at 75 % of what they are or less" in cure(
        sheet, "coverage-gap-1"
    )


def test_a_cracked_section_without_bars_has_no_deflection(existing: Existing) -> None:
    """Dead load where the bars end: 3/8*19.8*6*2.3 - 19.8*2.3**2/2 = 50.09 kN.m.

    M_cr = 0.5*0.6*sqrt(30)*400*500**2/6 = 27.39 kN.m with half of f_r (9.8.2.3). Of span 2 the top
    bars fail too: 3-25M end 0.90 m from the axis, where 2-15M begin. All loads on both spans, 34.2
    kN/m: V_B = 5/8*34.2*6 = 128.25 kN, M = 34.2*6**2/8 - 128.25*0.9 + 34.2*0.9**2/2 = 52.3 kN.m; of
    dead load alone 19.8/34.2 of it, 30.3 kN.m.
    """
    _, sheet, record = existing
    made = sheet.entries_of("deflection-1")
    M_cr = 0.3 * math.sqrt(30) * 400 * 500**2 / 6
    assert made["x_f"].value == 2300
    assert made["M_s"].value == pytest.approx(44.55e6 * 2.3 - 9.9e6 * 2.3**2, rel=1e-9)
    over, nothing = made["deflection-whole"].value
    assert (over, nothing) == (pytest.approx(made["M_s"].value - M_cr, rel=1e-9), 0)
    assert "deflection-1/deflection-whole" in record.failed
    made = sheet.entries_of("deflection-2")
    assert made["x_f"].value == 900
    dead = 19.8e6 * 6**2 / 8 - 74.25e6 * 0.9 + 9.9e6 * 0.9**2
    assert made["M_a"].value == pytest.approx(dead, rel=1e-9)
    assert "deflection-2/deflection-whole-top" in record.failed


def test_a_span_continuous_with_a_hinge_is_given_no_deflection() -> None:
    """Its moments were found without the hinge; top bars run through the whole beam."""
    runs = [LEFT, RIGHT, row("top", "3-25M", -0.1, 12.1)]
    _, sheet = built(runs)
    record = sheet.close()
    (own,) = (e for e in sheet.entries_of("deflection-1").values() if e.kind == "check")
    (beside,) = (e for e in sheet.entries_of("deflection-2").values() if e.kind == "check")
    assert beside.value == own.value
    assert (beside.extra or {})["title"].startswith("Span 1, with which this span is continuous")
    assert "deflection-2/deflection-whole" in record.failed
    assert "deflected" not in sheet.entries_of("summary")
    assert recompute(record) == []


def test_a_gap_off_the_middle_is_where_the_moment_is_largest() -> None:
    """4-20M end at 1.2 m and begin at 2.6 m: at 2.425 m there are none, though at 3.0 m there are.

    Of span 2 they stand fully developed: 1200 mm2 give 169.9 kN.m. Dead load at 2.25 m, where it is
    largest: 44.55**2/(2*19.8) = 50.12 kN.m.
    """
    off = [row("bottom", "4-20M", -0.1, 1.2), row("bottom", "4-20M", 2.6, 12.1), OVER, *BESIDE]
    _, sheet = built(off)
    record = sheet.close()
    assert sheet.entries_of("sag-1")["strength"].value == (pytest.approx(136.26e6, rel=1e-4), 0.0)
    M_r = sheet.entries_of("sag-2")["strength"].value[1]
    assert M_r == pytest.approx(moment(1200, D_BOTTOM), rel=1e-9)
    assert {"sag-1/strength", "deflection-1/deflection-whole"} <= set(record.failed)
    made = sheet.entries_of("deflection-1")
    assert made["x_f"].value == 2250
    assert made["M_s"].value == pytest.approx(44.55e3**2 / (2 * 19.8), rel=1e-9)
    assert recompute(record) == []


def test_bars_that_end_near_the_largest_moment_count_in_part_there() -> None:
    """4-20M end at 3.02 m, 595 mm past 2.425 m: 595/683.6*1200 = 1044.4 mm2, 149.4 kN.m."""
    near_by = [row("bottom", "4-20M", -0.1, 3.02), row("bottom", "4-20M", 3.06, 12.1), OVER]
    _, sheet = built([*near_by, *BESIDE])
    x = 112.3875 / 46.35 * 1000
    area = 1200 * math.floor(10 * (3020 - x)) / 10 / shown(L_20)
    assert sheet.entries_of("sag-1-developed")["A_sd"].value == pytest.approx(area, rel=1e-6)
    M_r = sheet.entries_of("sag-1")["strength"].value[1]
    assert M_r == pytest.approx(moment(area, D_BOTTOM), rel=1e-6)
    assert M_r == pytest.approx(149.4e6, abs=0.1e6)
    assert recompute(sheet.close()) == []


def test_top_bars_that_end_inside_the_column_do_not_count_at_its_faces() -> None:
    """3-25M from 5.9 to 6.1 m, faces at 5.8 and 6.2: there 2-15M stand, 100 mm from their ends.

    15M: l_d = 0.6*1.3*0.8*400/sqrt(30)*16 = 729 mm; 100/729*400 = 54.9 mm2, d = 450.7 mm, 8.4 kN.m.
    """
    inside = [row("bottom", "4-20M", -0.1, 12.1), row("top", "3-25M", 5.9, 6.1)]
    beside = [row("top", "2-15M", -0.1, 5.9), row("top", "2-15M", 6.1, 12.1)]
    _, sheet = built([*inside, *beside])
    record = sheet.close()
    area = 400 * 100 / shown(0.6 * 1.3 * 0.8 * 400 / math.sqrt(30) * 16)
    for face in ("hog-2-left", "hog-2-right"):
        M_f, M_r = sheet.entries_of(face)["strength"].value
        assert M_f == pytest.approx(174.8e6, rel=1e-3)
        assert M_r == pytest.approx(moment(area, 500 - 30 - 11.3 - 8), rel=1e-9)
        assert f"{face}/strength" in record.failed
    # Where the bars meet, at 5.9 m, none counts: a hinge inside the column.
    assert sheet.entries_of("deflection-1")["x_f"].value == 5900
    assert "deflection-1/deflection-whole-top" in record.failed
    assert recompute(record) == []


def test_the_bars_at_the_supports_are_those_that_stand_there(existing: Existing) -> None:
    """On both sides of a gap the bars run into their support: 4-20M, and none are missing."""
    _, sheet, record = existing
    for near_end in ("left", "right"):
        entries = sheet.entries_of(f"anchorage-bottom-1-{near_end}")
        assert entries["bars-text"].source.text == "Into the support: 4-20M."
    assert not any(key.endswith("bars-into-support") for key in record.failed)


def test_bars_beside_those_of_the_section_run_into_their_support() -> None:
    """2-20M run through, 2-20M more end at 2.0 m and begin at 3.0 m: 4-20M reach either support."""
    ends = [row("bottom", "2-20M", -0.1, 2.0), row("bottom", "2-20M", 3.0, 12.1)]
    _, sheet = built([row("bottom", "2-20M", -0.1, 12.1), *ends, OVER, *BESIDE])
    assert sheet.entries_of("sag-1")["A_s"].value == 600
    for near_end in ("left", "right"):
        entries = sheet.entries_of(f"anchorage-bottom-1-{near_end}")
        assert entries["bars-text"].source.text == "Into the support: 4-20M."
        assert entries["A_se"].value == 1200
    assert recompute(sheet.close()) == []


def test_a_simple_support_without_bottom_bars_fails_by_its_own_rule() -> None:
    """The bars begin 0.5 m inside the face: a third of the steel is asked for at the wall, none is.

    A third of 4-20M is 400 mm2 (12.11.1); a quarter would be the rule of a continuous support.
    """
    _, sheet = built([row("bottom", "4-20M", 0.65, 12.1), OVER, *BESIDE])
    left, right = sheet.entries_of("anchorage-bottom-1-left")["bars-into-support"].value
    assert (left, right) == (pytest.approx(400), 0.0)


def test_a_support_without_top_bars_is_not_given_any() -> None:
    """What does not stand is not chosen: no resistance, no bars in the table of the summary."""
    beam, sheet = built([row("bottom", "4-20M", -0.1, 12.1), *BESIDE], cures=True)
    record = sheet.close()
    assert beam.design.top.keys() == set()
    for face in ("hog-2-left", "hog-2-right"):
        entries = sheet.entries_of(face)
        assert entries["strength"].value == (pytest.approx(174.8e6, rel=1e-3), 0.0)
        assert entries["bars-text"].source.text == "Top bars: none."
        assert f"{face}/strength" in record.failed
    assert "mm² of bars through this section" in cure(sheet, "hog-2-left")
    assert recompute(record) == []


def test_a_span_without_any_bottom_bars_fails_throughout() -> None:
    """Bars stand in span 2 alone: span 1 has no resistance, the package is made all the same.

    The tension in the bottom ends where 0.9D + 1.5L on span 1 leaves none: w_f = 39.42 kN/m, V_A =
    96.795 kN, (96.795*x - 19.71*x**2)/0.404 + (39.42*x - 96.795)*cot(35) = 0 at x = 5.555 m.
    """
    _, sheet = built([row("bottom", "4-20M", 6.1, 12.1), OVER, *BESIDE])
    record = sheet.close()
    assert {"sag-1/strength", "coverage-bottom/strength"} <= set(record.failed)
    assert "sag-2/strength" not in record.failed
    gap = gaps_of_span(sheet, 1)
    assert gap == "Gap in the bottom bars, span 1, 0.15 to 5.55 m from its left axis"


def gaps_of_span(sheet: Sheet, span: int) -> str:
    """The title of the worst check of the bottom bars."""
    check = sheet.entries_of("coverage-bottom")["strength"]
    title = str((check.extra or {})["title"])
    assert f"span {span}" in title
    return title


METHODS = {"general": [{"span": k, "spacing": "250 mm"} for k in (1, 2)], "simplified": []}
"""Stirrups with which the gap is looked at by each method."""


@pytest.mark.parametrize("method", METHODS)
def test_without_bars_in_tension_there_is_no_shear_resistance(method: str) -> None:
    """(M_f/d_v + V_f)/(2*E_s*0.003) of bars are asked for, none are there: by either method."""
    beam, sheet = built(shear_method=method, stirrups=METHODS[method])
    parts = [p for p in sheet.parts if "strain-bars" in p.entries]
    assert any(p.key.startswith("shear-1-along") for p in parts)
    for part in parts:
        e = part.entries
        M_f, V_f, d_v = (e[n].value for n in ("M_f", "V_f", "d_v"))
        asked, there = e["strain-bars"].value
        assert asked == pytest.approx((max(M_f, V_f * d_v) / d_v + V_f) / 1200, rel=1e-9)
        assert there == 0
        assert "V_r" not in e
        assert failing(part)
    record = close_anyway(sheet)
    assert recompute(record) == []
    assert "shear-1-along/strain-bars" in record.failed
    # In the gap the figure of shears shows none; beside it a bar counts in quarters of 683.6 mm,
    # rounded down, on stations 50 mm apart: from 2300 - 171 - 50 to 3000 + 171 + 50 at most.
    shear = [s for s in beam.design.designed.shear if s.end <= 5800]
    assert {s.V_r for s in shear if s.start < 3000 and s.end > 2300} == {0.0}
    assert all(s.V_r > 0 for s in shear if s.start >= 850 and s.end < 2300 - L_20 / 4 - 50)
    assert all(s.V_r > 0 for s in shear if s.start > 3000 + L_20 / 4 + 50 and s.end < 4000)


def test_a_hogging_midspan_with_bars_developed_in_part() -> None:
    """Span 2 of 9, 3, 9 m hogs; 5-25M of both sides end 0.30 m past its middle.

    The lap of like bars, 0.60 m, is too short: each counts 300 mm of the lap needed, 1.3*l_d.
    """
    over = [row("top", "5-25M", -0.15, 10.8), row("top", "5-25M", 10.2, 20.9)]
    beam = start(spans=["9 m", "3 m", "9 m"], bar_runs=[row("bottom", "4-25M", -0.15, 20.9), *over])
    sheet = run(beam, CALLS[:6])
    made = sheet.entries_of("deflection-2-top")
    # 620 mm deep, 32 MPa, stirrups at least the minimum: 0.45*1.3*400/sqrt(32)*25.2*1.3
    lap = shown(1.3 * 0.45 * 1.3 * 400 / math.sqrt(32) * 25.2)
    assert [made[n].value for n in ("l_av1", "l_av2")] == [300.0, 300.0]
    assert made["l_d1"].value == pytest.approx(lap, rel=1e-6)
    assert made["A_s"].value == pytest.approx(2 * 2500 * 300 / lap, rel=1e-6)
    assert "I_crt" in sheet.entries_of("deflection-2-sections")
    assert recompute(close_anyway(sheet)) == []
