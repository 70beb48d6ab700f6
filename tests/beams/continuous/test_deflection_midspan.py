"""Spans that hog at midspan under service load: the top bars there, the cracked web, the cures."""

from __future__ import annotations

import math
from functools import cache
from typing import Any

import pytest

from lineproof.beams.continuous import deflections as chapter
from lineproof.beams.continuous.beam import DEFLECTIONS_CALL
from lineproof.beams.continuous.cutoff_sets import Group
from lineproof.beams.continuous.deflection import deflections
from lineproof.beams.continuous.deflection_figure import bent_of, deflection_shapes_figure
from lineproof.beams.continuous.deflection_hinges import stiffness_checks
from lineproof.beams.continuous.developed import developed_at, record_groups
from lineproof.beams.continuous.layout import BarRun
from lineproof.beams.continuous.resistance import Standing
from lineproof.beams.steps import Steps
from lineproof.record import Record
from lineproof.record.recompute import recompute

from ..pocket import faults  # noqa: TID252 - one calculator for all tests of beams
from .flow import CALLS, THREE_SPANS, close_anyway, record_of, run, start

SHORT_ENDS = ("3 m", "9.2 m", "3 m")
SHORT_MIDDLE = ("9 m", "4 m", "9 m")
BY_HAND: dict[tuple[str, ...], dict[int, tuple[int, int, float]]] = {
    SHORT_ENDS: dict.fromkeys((1, 3), (9, 200, 16.0)),
    SHORT_MIDDLE: {2: (6, 300, 19.5)},
}
"""Spans that hog: bars through midspan as laid out by hand from the schedule, area, diameter.

Short end spans, midspan at 1500: 2-15M to the outer end, 3-15M within the web and 4-15M in the
overhangs over support 2 are developed to both sides (l_d 529 and 407). Short middle span, midspan
at 11000: 2-20M run through from 6500 to 15500, and so do the 4-20M of either support, since they
would pass each other.
"""


@cache
def _record(spans: tuple[str, ...]) -> Record:
    return record_of(spans=list(spans))


def _parts(record: Record) -> dict[str, dict[str, Any]]:
    return {part["key"]: part for part in record.data["parts"]}


@pytest.mark.parametrize("spans", BY_HAND)
def test_whole_record_recomputes_and_is_followed_by_hand(spans: tuple[str, ...]) -> None:
    record = _record(spans)
    assert recompute(record) == []
    assert list(faults(record.data)) == []
    tops = [key for key in _parts(record) if key.endswith("-top") and key.startswith("deflection")]
    assert tops == [f"deflection-{k}-top" for k in BY_HAND[spans]]


@pytest.mark.parametrize(("spans", "k"), [(s, k) for s, each in BY_HAND.items() for k in each])
def test_cracked_web_by_hand(spans: tuple[str, ...], k: int) -> None:
    """Web 380 x 620, cover 30, 10M stirrups (11.3 mm); normal density, 32 MPa."""
    entries = _record(spans).entries
    n_b, A_b, d_b = BY_HAND[spans][k]
    A_s, d = n_b * A_b, 620 - 30 - 11.3 - d_b / 2
    E_c = 4500 * math.sqrt(32)
    n = 200000 / E_c
    # 380 kd^2/2 = n A_s (d - kd)
    kd = (math.sqrt((n * A_s) ** 2 + 2 * 380 * n * A_s * d) - n * A_s) / 380
    I_cr = 380 * kd**3 / 3 + n * A_s * (d - kd) ** 2
    top, sections = f"deflection-{k}-top", f"deflection-{k}-sections"
    assert _parts(_record(spans))[top]["title"] == f"Top bars at midspan of span {k}"
    assert entries[f"{top}/n_b"]["value"] == n_b
    assert entries[f"{top}/A_s"]["value"] == pytest.approx(A_s, rel=1e-9)
    assert entries[f"{top}/d"]["value"] == pytest.approx(d, rel=1e-12)
    assert entries[f"{sections}/kd_t"]["value"] == pytest.approx(kd, rel=1e-9)
    assert entries[f"{sections}/I_crt"]["value"] == pytest.approx(I_cr, rel=1e-9)
    rise = f"deflection-{k}-rise"
    M, M_crdn = entries[f"{rise}/M_at"]["value"], entries[f"{sections}/M_crdn"]["value"]
    I_g = 380 * 620**3 / 12
    assert M_crdn < M
    I_e = I_cr + (I_g - I_cr) * (M_crdn / M) ** 3
    assert entries[f"{rise}/I_em"]["value"] == pytest.approx(I_e, rel=1e-9)


def test_ordinary_spans_have_no_such_part() -> None:
    assert not any(key.startswith("deflection-") and key.endswith("-top")
                   for key in _parts(_record(("7.6 m", "9.2 m", "7.6 m"))))  # fmt: skip


@pytest.mark.parametrize("spans", BY_HAND)
def test_figure_and_cures_bend_what_is_recorded(spans: tuple[str, ...]) -> None:
    beam = start(spans=list(spans))
    sheet = run(beam, CALLS[:-1])
    design = beam.design
    model = design.model
    for k in BY_HAND[spans]:
        section, _ = bent_of(model, k, {})
        stages = chapter.service_of(model, k).stages
        made = deflections(section, stages, carries=model.inputs.carries)
        recorded = sheet.entries_of(f"deflection-{k}-sections")
        assert made.cracked["top"].I_cr == pytest.approx(recorded["I_crt"].value, rel=1e-9)
        for stage, symbol in (("dead", "delta_D"), ("all", "delta_DL"), ("rise", "delta_R")):
            delta = sheet.entries_of(f"deflection-{k}-{stage}")[symbol].value
            assert made.stages[stage].delta == pytest.approx(delta, rel=1e-6)  # type: ignore[index]
    assert deflection_shapes_figure(design) is not None


def test_nothing_runs_through() -> None:
    """No deflection is printed, but a check that fails: the web cracks and nothing holds it.

    Given 5-25M end 0.50 m before midspan from either side. Dead load w on spans of 9, 4 and 9 m:
    M_B*2*(9 + 4) + M_C*4 = -w*(9**3 + 4**3)/4, so M_B = M_C = -793/120*w. Where the bars end, 1.5 m
    from the axis, M = -793/120*w + w*1.5*2.5/2, more than at midspan.
    """
    rows = [
        {"face": face, "bars": "5-25M", "start": f"{start_at} m", "end": f"{end} m"}
        for face, start_at, end in (
            ("bottom", -0.15, 22.15), ("top", -0.15, 10.5), ("top", 11.5, 22.15),
        )
    ]  # fmt: skip
    beam = start(spans=list(SHORT_MIDDLE), bar_runs=rows)
    run(beam, CALLS[:6])
    made = beam.sheet.entries_of("deflection-2")
    w = beam.sheet.entry("loads/w_D2").value
    M_crdn = 0.3 * math.sqrt(32) * 380 * 620**2 / 6
    over, nothing = made["deflection-whole-top"].value
    assert made["x_f"].value == 1500
    assert made["M_a"].value == pytest.approx(w * 1e6 * (793 / 120 - 1.5 * 2.5 / 2), rel=1e-9)
    assert (over, nothing) == (pytest.approx(made["M_a"].value - M_crdn, rel=1e-9), 0)
    assert not made["deflection-whole-top"]
    for k in (1, 3):  # continuous with it
        (check,) = stiffness_checks(beam.sheet, k)
        assert not check
    parts = [part for part in beam.sheet.parts if part.key.startswith("deflection-")]
    assert [key for part in parts for key in part.entries if key.startswith("delta")] == []


def test_a_span_that_needs_no_calculation_records_no_bars() -> None:
    beam = start(
        spans=list(SHORT_MIDDLE), carries="floor, nothing attached that deflection damages"
    )
    sheet = run(beam, CALLS[:6])
    assert not any(part.key == "deflection-2-top" for part in sheet.parts)


def _standing(start: float, end: float, *laps: str, number: int = 2) -> Standing:
    run = BarRun("top", 1, number, "20M", start, end)
    return Standing(run, 600.0, 600.0, 51.0, *("start" in laps, "end" in laps) * 2)


def test_bars_count_by_their_development_to_both_sides() -> None:
    assert len(developed_at([_standing(0, 1200)], "top", 600.0)) == 1
    (short,) = developed_at([_standing(0, 1100)], "top", 600.0)
    assert (short.length, short.rise) == (500.0, 600.0)  # 1100 - 600 of 600 mm
    assert developed_at([_standing(700, 5000)], "top", 600.0) == ()
    assert all(met.whole for met in developed_at([_standing(0, 1200)], "top", 600.0))
    lap = [_standing(-4000, 1000, "end"), _standing(400, 5000, "start")]
    for x in (420.0, 699.0, 700.0, 701.0, 980.0):
        assert sum(met.run.number for met in developed_at(lap, "top", x)) == 2


def test_bars_of_several_sizes_and_layers() -> None:
    """3-20M and 2-25M in the first layer, 2-20M in the second, over the 25M."""
    beam = start()
    sheet = run(beam, CALLS[:4])
    title = "Top bars at midspan of span 1"
    with sheet.chapter(DEFLECTIONS_CALL), sheet.part("deflection-1-top", title):
        steps = Steps(sheet, {"h": sheet.entry("given/h"), "c_c": sheet.find("c_c")})
        steps.bind(d_bs=sheet.entries_of("sag-1")["d_bs"])
        groups = Group(1, "20M", 3, "20M"), Group(1, "25M", 2, "25M"), Group(2, "20M", 2, "25M")
        record_groups(steps, [(group, None) for group in groups], "midspan")
    made = sheet.entries_of("deflection-1-top")
    above = 620 - 30 - 11.3
    second = above - 25.2 - max(1.4 * 25.2, 1.4 * 20, 30) - 19.5 / 2
    first = above - 19.5 / 2, above - 25.2 / 2
    assert made["A_s"].value == 900 + 1000 + 600
    centroid = (900 * first[0] + 1000 * first[1] + 600 * second) / 2500
    assert made["d"].value == pytest.approx(centroid, rel=1e-12)
    record = close_anyway(sheet)
    assert recompute(record) == []
    assert list(faults(record.data)) == []


def test_inputs_are_those_of_the_hand_calculation() -> None:
    assert [THREE_SPANS[n] for n in ("h", "b_w", "f_c", "cover")] == [
        "620 mm", "380 mm", "32 MPa", "30 mm",
    ]  # fmt: skip


def test_hogging_of_the_construction_stage_counts_at_later_stages() -> None:
    """It is larger than that of the dead load, so the web is as cracked as by it."""
    beam = start(spans=list(SHORT_MIDDLE), construction_load="4 kPa")
    named = [row["check"] for row in beam.sheet.not_covered]
    assert any(check.startswith("Strength under the construction load") for check in named)
    sheet = run(beam, CALLS[:6])
    earlier = sheet.entries_of("deflection-2-construction")["M_aem"].value
    dead = sheet.entries_of("deflection-2-dead")
    assert earlier < dead["M_m"].value < 0
    assert dead["M_at"].value == -earlier
    section, moments = bent_of(beam.model, 2, {})
    made = deflections(section, moments, carries=beam.inputs.carries)
    assert made.stages["dead"].I_em == pytest.approx(dead["I_em"].value, rel=1e-6)
    record = close_anyway(sheet)
    assert recompute(record) == []
    assert list(faults(record.data)) == []
