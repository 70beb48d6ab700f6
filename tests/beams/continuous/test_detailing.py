"""Bars laid over whole beams: every station covered, every rule kept, every line followed."""

from __future__ import annotations

from dataclasses import replace
from itertools import pairwise

import numpy as np
import pytest
from hypothesis import HealthCheck, Phase, given, settings

from lineproof.beams.bars import BarLayer
from lineproof.beams.continuous.anchorage import hook_at
from lineproof.beams.continuous.cutoff import Frame, zone_at
from lineproof.beams.continuous.cutoff_ends import bottom_side, passes, top_side
from lineproof.beams.continuous.cutoff_need import need_of
from lineproof.beams.continuous.detailing import lay_bars
from lineproof.beams.continuous.detailing_bottom import lay_bottom
from lineproof.beams.continuous.detailing_data import (
    Designed,
    SectionBars,
    SupportTop,
    TorsionForces,
)
from lineproof.beams.continuous.detailing_holders import with_holders
from lineproof.beams.continuous.detailing_record import record_detailing
from lineproof.beams.continuous.detailing_ties import beside_ties, hook_ties
from lineproof.beams.continuous.layout import BarRun, BeamOutline, StirrupZone
from lineproof.beams.continuous.resistance import in_line, lap_pairs, stand
from lineproof.beams.continuous.resistance_cover import covered
from lineproof.errors import UserError
from lineproof.record import Record, recompute

from ..pocket import faults  # noqa: TID252 - one calculator for all tests of beams
from .laid import (
    AREAS,
    DIAMETERS,
    PAIR_24,
    beam_of,
    designed_sections,
    entries,
    random_beams,
    sheet_of,
    three_spans,
    writers_of,
)

random = settings(
    max_examples=40, deadline=None, derandomize=True, database=None,
    suppress_health_check=list(HealthCheck), phases=[Phase.generate],
)  # fmt: skip


def by_hand(designed: Designed, runs: tuple[BarRun, ...], count: int) -> float:
    """The worst M_f/M_r over all cases at stations of every span, worked out apart.

    Areas in proportion to the distance from the nearer end over the development length of the
    run; one stress block in the flange or the web; moments of every case at the faces inside.
    """
    worst = 0.0
    standing = stand(designed, runs)
    outline = designed.outline
    for k, length in enumerate(outline.lengths, start=1):
        start, end = outline.supports[k - 1].half, length - outline.supports[k].half
        x = np.linspace(start + 100 * (start == 0), end - 100 * (end == length), count)
        M, _ = designed.forces.along(k, x)
        at = x + outline.axes[k - 1]
        for face, M_f, b in (
            ("bottom", M.max(axis=0), outline.widths[k - 1]), ("top", -M.min(axis=0), outline.b_w),
        ):  # fmt: skip
            A, lever = np.zeros(count), np.zeros(count)
            for s in (s for s in standing if s.run.face == face):
                room = np.minimum((at - s.run.start) / s.rise_start, (s.run.end - at) / s.rise_end)
                part = s.run.number * AREAS[s.run.size] * np.clip(room, 0, 1)
                A, lever = A + part, lever + part * s.distance
            for M_i, A_i, lever_i in zip(M_f.tolist(), A.tolist(), lever.tolist(), strict=True):
                if M_i > 1e3:
                    d = outline.depths[k - 1] - lever_i / A_i
                    worst = max(worst, M_i / block(A_i, d, b, outline, face))
    return worst


def block(A: float, d: float, b: float, outline: BeamOutline, face: str) -> float:
    """M_r with the stress block in the flange or the web."""
    stress, force = 0.7975 * 0.65 * 35, 0.85 * 400 * A
    a = force / (stress * b)
    if face == "top" or a <= outline.h_f or not outline.h_f:
        return force * (d - a / 2)
    C_f = stress * (b - outline.b_w) * outline.h_f
    a_w = (force - C_f) / (stress * outline.b_w)
    return C_f * (d - outline.h_f / 2) + (force - C_f) * (d - a_w / 2)


@random
@given(designed=random_beams())
def test_every_station_is_covered(designed: Designed) -> None:
    """1,000 stations a span, every case, anchorage counted; and apart, by the moments alone."""
    runs = lay_bars(designed)
    found = covered(designed, runs, 1000)
    assert found.gaps == ()
    assert found.worst.ratio <= 1
    assert by_hand(designed, runs, 50) <= 1


@random
@given(designed=random_beams())
def test_rules_of_ends_hold(designed: Designed) -> None:
    """12.10.3 to 12.10.5, 12.11.1 and 12.12.2 at every end of bars, read from the runs."""
    runs = lay_bars(designed)
    frame = Frame.of(designed)
    outline = designed.outline
    for k in range(1, len(outline.lengths) + 1):
        if designed.cantilever(k):
            continue
        for near in ("left", "right"):
            side = bottom_side(designed, runs, k, near)
            support = k if near == "left" else k + 1
            simple = outline.supports[support - 1].kind == "simple" and designed.exterior(support)
            inside = sum(run.area for run in side.kept)
            assert inside >= sum(run.area for run in side.runs) / (3 if simple else 4) * (1 - 1e-9)
            assert outline.supports[support - 1].half - side.t_kept >= 150
            for index, ending in enumerate(side.cuts):
                assert zone_at(designed, "bottom", k, near, ending.t, side.continuing(index))
                need = need_of(frame, side, index)
                assert need is not None
                d = outline.depths[k - 1] - 51.3 - 12.6
                assert need.point.t - ending.t >= 12 * DIAMETERS[ending.runs[0].size]
                assert need.point.t - ending.t >= 0.9 * d
    for j in range(1, len(outline.supports) + 1):
        for towards in ("left", "right"):
            if not designed.bars.top[j - 1].web or not designed.forces.has_span(j, towards):
                continue
            side = top_side(designed, runs, j, towards)
            for index, ending in enumerate(side.cuts):
                assert zone_at(
                    designed, "top", side.span, side.near, ending.t, side.continuing(index)
                )
            long = sum(run.area for run in side.kept)
            if not passes(designed, side):
                assert long >= sum(run.area for run in side.runs) / 3 * (1 - 1e-9)


@random
@given(designed=random_beams())
def test_runs_are_buildable(designed: Designed) -> None:
    """Inside the concrete, no longer than the stock, at most two cut-off lengths, 2 corner bars."""
    runs = lay_bars(designed)
    low, high = designed.outline.ends
    for run in runs:
        assert low < run.start < run.end < high
        assert run.end - run.start <= designed.stock
        assert run.number >= 1
    for face in ("bottom", "top"):
        for x in np.arange(low + 60, high - 60, 200.0).tolist():
            there = [r for r in runs if r.face == face and r.layer == 1 and r.start < x < r.end]
            assert sum(r.number for r in there if r.place == "web") >= 2, (face, x)
    for k in range(1, len(designed.outline.lengths) + 1):
        if not designed.cantilever(k):
            assert len(bottom_side(designed, runs, k, "left").cuts) <= 2


@settings(parent=random, max_examples=15)
@given(designed=random_beams())
def test_record_of_whole_beams(designed: Designed) -> None:
    """Every printed line redone by a calculator; the record recomputes; every check holds."""
    runs = lay_bars(designed)
    sheet = sheet_of(designed)
    record_detailing(writers_of(sheet, designed), runs, 200)
    record = sheet.close()
    assert list(faults(record.data)) == []
    assert recompute(Record.from_text(record.to_text())) == []
    failed = {e["id"] for e in entries(record.data).values() if e.get("holds") is False
              and e["kind"] == "check"}  # fmt: skip
    # bars for the moment alone may be too few for the force at an end support, all of them hooked
    ends = {1: designed.bars.bottom[0], len(designed.outline.supports): designed.bars.bottom[-1]}
    for support, layers in ends.items():
        key = f"anchorage-end-{support}-bottom"
        if f"{key}/bars-end-support" in failed:
            A_sd = sheet.entry(f"{key}/A_sd").value
            assert A_sd == pytest.approx(sum(layer.area for layer in layers))
            failed.remove(f"{key}/bars-end-support")
    assert failed == set()


@settings(parent=random, max_examples=15)
@given(designed=random_beams())
def test_recorded_worst_stations_are_the_numbers(designed: Designed) -> None:
    """M_r, A_sd and F of the worst stations at 1e-9, from the recorded developed areas."""
    runs = lay_bars(designed)
    sheet = sheet_of(designed)
    found = record_detailing(writers_of(sheet, designed), runs, 300)
    keys = {part.key for part in sheet.parts}
    for face in ("bottom", "top"):
        worst = max(
            (s for s in found.by_moment if s.face == face),
            key=lambda s: s.M_f / s.M_r if s.M_r else 0.0,
        )
        if worst.M_f > 1e3:
            made = sheet.entries_of(f"coverage-{face}")
            assert made["M_r"].value == pytest.approx(worst.M_r, rel=1e-9)
            assert made["M_f"].value == pytest.approx(worst.M_f, rel=1e-9)
        if f"coverage-{face}-tension" in keys:
            made = sheet.entries_of(f"coverage-{face}-tension")
            worst = max(
                (s for s in found.by_tension if s.face == face),
                key=lambda s: s.F / s.F_r if s.F_r else 0.0,
            )
            # the cap is that of the flat top of the moment, recorded within half a millimetre of
            # it: w (0.5)^2/2 of a moment is less than 1e-7 of the force
            force, near = (made["F_ltc"], 1e-7) if "F_ltc" in made else (made["F_lt"], 1e-9)
            assert force.value == pytest.approx(worst.F, rel=near)
            assert 340 * made["A_sd"].value == pytest.approx(worst.F_r, rel=1e-9)


def test_three_spans_are_as_a_detailer_would_lay_them() -> None:
    """Symmetric; bottom corner bars lapped over the inner supports; top corners past inflection."""
    designed = three_spans()
    runs = lay_bars(designed)
    total = designed.outline.axes[-1]
    mirrored = sorted(
        (r.face, r.layer, r.number, r.size, total - r.end, total - r.start) for r in runs
    )
    assert mirrored == sorted((r.face, r.layer, r.number, r.size, r.start, r.end) for r in runs)
    corners = [r for r in runs if r.face == "bottom" and r.serves == "spans 1 to 3"]
    assert len(corners) == 3
    assert [(a.end + b.start) / 2 for a, b in pairwise(corners)] == [
        7600.0,
        16800.0,
    ]
    assert all(run.end - run.start <= 12000 for run in runs)
    assert {run.hook_start for run in runs if run.face == "top" and run.start == -150.0} == {"90"}
    holders = [run for run in runs if run.serves == "holds the stirrups"]
    # Between the inner supports 11350 to 13050 is less than two laps of 1000: no bars there.
    assert len(holders) == 2
    assert all(any(in_line(a, b) or in_line(b, a) for b in runs) for a in holders)


def test_holders_of_the_size_of_the_corners_are_one_with_them() -> None:
    """25M all along: no bars that only hold the stirrups; corner bars are lapped at midspan."""
    designed = three_spans()
    same = replace(designed, bars=replace(designed.bars, holders="25M"))
    runs = lay_bars(same)
    assert all(run.serves != "holds the stirrups" for run in runs if run.size != "25M")
    top = [run for run in runs if run.face == "top"]
    laps = [(top[i], top[j]) for i, j in lap_pairs(top)]
    assert len(laps) == 3
    for first, second in laps:
        centre = (first.end + second.start) / 2
        assert min(abs(centre - middle) for middle in (3800.0, 12200.0, 20600.0)) < 25
    assert covered(same, runs, 500).holds


def test_like_bars_that_would_pass_each_other_run_through() -> None:
    """Into a support of 250 mm the bars go 150 mm: 25 mm past its axis, on the module 50 mm.

    Of 5-25M and 4-25M the two in the corners run through anyhow, of the 3 and 2 others 2 do; the
    third ends 50 mm past the axis. In supports of 400 mm they end 50 mm before it.
    """
    five, four = ((BarLayer(5, "25M"),), (BarLayer(4, "25M"),))
    for width, expected in (
        (250.0, [(2, -75.0, 10075.0), (1, -75.0, 5050.0)]),
        (400.0, [(3, -150.0, 4950.0), (2, 5050.0, 10150.0)]),
    ):
        bare = beam_of((5000.0, 5000.0), ("elastic",) * 3, width=width, b_w=420.0)
        bars = SectionBars((five, four), (SupportTop((BarLayer(2, "25M"),)),) * 3, "15M")
        none, cases = np.zeros(2), np.zeros(len(bare.forces.cases))
        x = np.array([0.0, 5000.0])
        at, nothing = np.tile(x, (len(cases), 1)), np.zeros((len(cases), 2))
        counts = TorsionForces(
            x, none, none, (cases, cases), 1.0, 1.0, at, (nothing, nothing)
        )  # fmt: skip
        designed = replace(bare, bars=bars, torsion={1: counts, 2: counts})
        runs = lay_bottom(Frame.of(designed, 50))
        inner = [(run.number, run.start, run.end) for run in runs[1:]]
        assert sorted(inner) == sorted(expected)


def test_no_holders_beside_top_bars_that_reach_the_end() -> None:
    """Corner bars that stand to the end of the beam hold the stirrups themselves."""
    designed = three_spans()
    corners = {k: BarRun("top", 1, 2, "25M", 0.0, 0.0) for k in (1, 2, 3, 4)}
    end = designed.outline.axes[-1] + 150.0
    whole = {3: replace(corners[3], start=12000.0, end=end)}
    made = with_holders(designed, whole)
    assert [run.end for run in made if run.start >= 16800.0] == []
    assert max(run.end for run in made) == end


def test_ties_around_the_hooks() -> None:
    """20M hooks: 3 x 19.5 = 58.5: ties at 50 mm from the cover to the face, 7 in 350 mm."""
    designed = three_spans()
    runs = lay_bars(designed)
    sizes = {run.size for run in runs if run.hook_start}
    assert sizes == {"25M"}
    first, last = hook_ties(designed, runs, ())
    assert (first.span, first.start, first.number, first.spacing) == (1, -150.0, 4, 75.0)
    assert (last.span, last.end) == (3, designed.outline.axes[-1] + 150.0)


def test_ties_at_a_free_end_take_the_place_of_stirrups() -> None:
    """Ties at 75 mm over the hook of 25M bars at least, the first stirrup 100 mm beyond.

    The bars end at 50 mm; l_dh is that of the tests of hooks.
    """
    cantilever = beam_of((2000.0, 7600.0), ("free", "elastic", "elastic"))
    designed = designed_sections(cantilever, "25M", "15M")
    bars = (BarRun("top", 1, 2, "25M", 50.0, 4000.0, hook_start="90"),)
    l_dh = hook_at(designed, 1, "25M").l_dh
    stirrups = StirrupZone(1, 75.0, 1575.0, 6, 300.0, "10M")
    (kept,) = beside_ties(designed, bars, [stirrups])
    (ties,) = hook_ties(designed, bars, [kept])
    assert kept.start in {75.0 + 300.0 * n for n in range(6)}
    assert (kept.end, kept.spacing) == (1575.0, 300.0)
    assert kept.number == 1 + (1575.0 - kept.start) / 300.0
    assert ties.spacing == 75.0  # 3 x 25.2 = 75.6, down to 5 mm
    assert ties.end == pytest.approx(kept.start - 100.0)
    assert 50.0 <= ties.start < 125.0
    assert 50.0 + l_dh <= ties.end < 50.0 + l_dh + 300.0


def test_bars_of_the_2024_edition_are_straight() -> None:
    """No hooks; where the columns are too narrow the record says that they count in part."""
    bare = beam_of((7600.0, 7600.0), ("elastic",) * 3, pair=PAIR_24)
    designed = designed_sections(bare, "25M", "15M")
    runs = lay_bars(designed)
    assert all(not run.hook_start and not run.hook_end for run in runs)
    sheet = sheet_of(designed)
    record_detailing(writers_of(sheet, designed), runs, 200)
    made = entries(sheet.close().data)
    assert made["anchorage-end-1-top-1/development-in-part"]["holds"]
    assert "anchorage-end-1-top-1/development" not in made


def test_hooks_given_in_the_2024_edition_are_refused_by_the_record() -> None:
    designed = replace(three_spans(), pair=replace(three_spans().pair, concrete="CSA A23.3:24"))
    runs = lay_bars(three_spans())
    sheet = sheet_of(designed)
    with pytest.raises(UserError, match="hooks cannot be calculated"):
        record_detailing(writers_of(sheet, designed), runs, 100)


def test_wide_supports_take_straight_bars() -> None:
    """1.1 m walls: 25M top bars develop 997 mm straight in 1050."""
    bare = beam_of((8000.0,), ("elastic", "elastic"), width=1100.0)
    runs = lay_bars(designed_sections(bare, "25M", "15M"))
    assert all(not run.hook_start and not run.hook_end for run in runs)


def test_a_gap_fails_in_the_record() -> None:
    """Inner bars of span 2 cut too early: the coverage does not hold, the table says where."""
    designed = three_spans()
    runs = tuple(
        replace(r, start=11000.0, end=13400.0) if r.serves == "span 2" and r.face == "bottom" else r
        for r in lay_bars(designed)
    )
    sheet = sheet_of(designed)
    found = record_detailing(writers_of(sheet, designed), runs, 300)
    assert not found.holds
    record = sheet.close()
    made = entries(record.data)
    assert made["coverage-bottom/strength"]["holds"] is False
    assert made["anchorage-bottom-2-left-cut-1/cut-extension"]["holds"] is False
    assert "Not enough bottom bars, span 2, " in made["coverage/gap-1"]["text"]
    assert any("FAILS" in cell for row in made["coverage/stations"]["rows"] for cell in row)
    assert list(faults(record.data)) == []


def test_bars_too_thick_to_lap_are_refused() -> None:
    """45M over 14 m: longer than the stock, and laps of 45M are not allowed."""
    bare = beam_of((14000.0,), ("simple", "simple"), h=1200.0, b_w=500.0)
    designed = replace(
        bare, bars=SectionBars(((BarLayer(4, "45M"),),), (SupportTop(), SupportTop()), "15M")
    )
    with pytest.raises(UserError, match=r"45M may not be lapped \(12.14.2\)"):
        lay_bars(designed)


def test_long_span_is_lapped_at_its_quarter_points() -> None:
    """14 m, bottom corner bars of 25M: in two pieces, lapped at a quarter of the clear span."""
    bare = beam_of((14000.0,), ("simple", "simple"), h=1200.0, b_w=500.0, D=20.0, L=10.0)
    designed = designed_sections(bare, "25M", "15M")
    runs = [r for r in lay_bars(designed) if r.face == "bottom"]
    corners = sorted((r for r in runs if r.start < 0 or r.end > 14000), key=lambda r: r.start)
    laps = [(a, b) for a in runs for b in runs if in_line(a, b)]
    assert laps
    quarter = 200 + 13600 / 4
    for first, second in laps:
        centre = (first.end + second.start) / 2
        assert min(abs(centre - quarter), abs(14000 - centre - quarter)) < 100
        assert first.end - second.start >= 996.7
    assert corners
    assert covered(designed, tuple(lay_bars(designed)), 500).holds


def test_record_without_a_shear_design() -> None:
    """No stirrups counted against the tension, no bar cut in a tension zone."""
    designed = replace(three_spans(), shear=())
    runs = lay_bars(designed)
    sheet = sheet_of(designed)
    record_detailing(writers_of(sheet, designed), runs, 200)
    record = sheet.close()
    made = entries(record.data)
    assert list(faults(record.data)) == []
    assert not any(key.endswith(("cut-low-shear", "cut-double-area")) for key in made)
    assert made["anchorage-end-1-bottom/V_s"]["printed"]["result"] == "0"


def test_force_at_the_end_as_given() -> None:
    """F_le of the shear design is taken as it is; too large a force fails."""
    for force, held in ((200e3, True), (700e3, False)):
        designed = replace(three_spans(), end_forces={1: force, 4: force})
        sheet = sheet_of(designed)
        record_detailing(writers_of(sheet, designed), lay_bars(designed), 100)
        made = entries(sheet.close().data)
        assert made["anchorage-end-1-bottom/bars-end-support"]["holds"] == held


def test_no_bars_at_all_fail_in_the_record() -> None:
    """A bottom gap of 1 m in span 1: no resistance there; a top support without any bars."""
    designed = three_spans()
    runs = tuple(
        replace(r, end=2500.0) if r.face == "bottom" and r.start < 2500 else r
        for r in lay_bars(designed)
    )
    sheet = sheet_of(designed)
    found = record_detailing(writers_of(sheet, designed), runs, 300)
    assert "no bars count there" in str(found.gaps[0])
    record = sheet.close()
    made = entries(record.data)
    assert made["coverage-bottom/strength"]["holds"] is False
    assert made["coverage-bottom/M_r"]["printed"]["result"] == "0"
    assert made["anchorage-bottom-1-right/bars-into-support"]["holds"] is False
    assert list(faults(record.data)) == []


def test_soffit_that_steps() -> None:
    """600 beside 700 mm: the higher bars develop beyond their face, the lower end inside."""
    bare = beam_of((8000.0, 8000.0), ("elastic",) * 3)
    outline = replace(bare.outline, depths=(600.0, 700.0))
    bare = replace(bare, basis=replace(bare.basis, outline=outline))
    designed = designed_sections(bare, "25M", "15M")
    runs = lay_bars(designed)
    bottom = [r for r in runs if r.face == "bottom"]
    assert max(r.end for r in bottom if r.start == -150) >= 7800 + 766.7
    assert min(r.start for r in bottom if r.end == 16150) == 7850.0
    assert covered(designed, runs, 500).holds
