"""Skin bars of deep beams: at spans and supports, and in schedule and drawings (10.6.2).

By hand, h = 900, cover 30, stirrup 10M (11.3), skin bars 10M (11.3, 100 mm2), slab 140. Top bars
20M (19.5): d = 900 - 30 - 11.3 - 9.75 = 848.95; strip 0.5*900 - 2*51.05 = 347.9 high and 2*(30 +
11.3 + 5.65) = 93.9 wide; A_sk = 0.008*2*347.9*93.9 = 522.7 mm2, 3 bars a strip, 347.9/3 = 116 mm.
Bottom bars 30M (29.9): 450 - 2*(41.3 + 14.95) = 337.5 mm, 507.1 mm2, 337.5/3 = 112.5 mm. The side
is 900 - 41.3 - 140 = 718.7 high: 6.2 or 6.4 gaps, so 7 gaps and 6 bars at each face.
"""

from __future__ import annotations

import json
from collections.abc import Mapping
from dataclasses import replace
from typing import Any

import pytest

from lineproof.record import Record

from .flow import record_of, run, start, typed_row

DEEP: Mapping[str, Any] = {
    "spans": ["2.8 m", "9 m"],
    "supports": ["free", "column 450 mm", "wall 400 mm"],
    "h": "900 mm", "b_w": "400 mm",
    "loads": [{"type": "D", "span": 1, "line": "40 kN/m", "what": "facade"}],
}  # fmt: skip


@pytest.fixture(scope="module")
def deep() -> Record:
    """Return the record of a deep beam with a cantilever, all bars chosen."""
    return record_of(**DEEP)


@pytest.mark.parametrize(
    ("part", "size", "A_sk", "s_sk"),
    [("sag-2", "30M", 507.1, 112.5), ("hog-2-right", "20M", 522.7, 116.0)],
)
def test_spans_and_supports_have_skin_bars(
    deep: Record, part: str, size: str, A_sk: float, s_sk: float
) -> None:
    assert size in deep.entries[f"{part}/bars-text"]["text"]
    assert deep.entries[f"{part}/A_sk"]["value"] == pytest.approx(A_sk, abs=0.05)
    assert deep.entries[f"{part}/n_k"]["value"] == 3
    assert deep.entries[f"{part}/s_sk"]["value"] == pytest.approx(s_sk, abs=0.05)
    assert deep.entries[f"{part}/skin-area"]["holds"]


def test_skin_bars_stand_in_schedule_and_drawings(deep: Record) -> None:
    """Six at each face from end to end; the schedule counts the laps: 2 x 12 bars."""
    rows = deep.entries["schedule/bars"]["rows"]
    skin = [row for row in rows if row[0].startswith("F")]
    assert sum(int(row[2]) for row in skin) == 24
    assert {row[1] for row in skin} == {"10M"}
    drawn = json.dumps(deep.entries["summary/elevation-1"])
    assert "F01" in drawn
    assert "F02" in drawn


def test_the_slab_takes_a_part_of_the_strip_at_a_support() -> None:
    """By hand, with a slab of 180 mm: below it the side is 900 - 41.3 - 180 = 678.7 mm high.

    Top bars as before, 3 bars in the strip. Above half the depth 450 - 180 = 270 mm of side are
    left: with six bars at each face they stand 678.7/7 = 97.0 mm apart, at 277, 374 and 471 mm from
    the top, and the third is past half the depth. So 270/3 = 90 mm, 7.5 gaps: seven at each face,
    84.8 mm apart, the third at 434 mm. From the bottom three of the six would have done.
    """
    beam = start(**DEEP, h_f="180 mm")
    run(beam)
    skin = [bars for bars in beam.design.detailing.bars if bars.place == "side face"]
    assert {bars.number for bars in skin} == {14}
    made = record_of(**DEEP, h_f="180 mm")
    assert made.entries["hog-2-right/n_k"]["value"] == 3
    assert made.entries["hog-2-right/skin-area"]["holds"]
    laid = beam.design.detailing.bars
    six = [replace(bars, number=12) if bars in skin else bars for bars in laid]
    fewer = record_of(**DEEP, h_f="180 mm", bar_runs=[typed_row(each) for each in six])
    assert fewer.entries["hog-2-right/n_k"]["value"] == 2
    assert "hog-2-right/skin-area" in fewer.failed
    assert fewer.entries["sag-2/n_k"]["value"] == 3


def test_skin_bars_that_leave_a_gap_are_none() -> None:
    """Given skin bars end at 6.0 m and begin again at 7.0 m: midspan at 7.3 m has them, 6.5 m not.

    In the strip at the support, a quarter of the clear 8.575 m from its face at 3.025 m, so up to
    5.17 m, they stand.
    """
    beam = start(**DEEP)
    run(beam)
    rows = [typed_row(each) for each in beam.design.detailing.bars]
    bars = [row for row in rows if row["place"] != "side face"]
    size = {"face": "bottom", "bars": "12-10M", "place": "side face"}
    ends = (("50 mm", "6 m"), ("7 m", "11.95 m"))
    skin = [{**size, "start": first, "end": last} for first, last in ends]
    made = record_of(**DEEP, bar_runs=[*bars, *skin])
    assert made.entries["sag-2/n_k"]["value"] == 0
    assert "sag-2/skin-area" in made.failed
    assert made.entries["hog-2-right/n_k"]["value"] == 3


def test_a_cantilever_alone_has_skin_bars() -> None:
    """No span sags: the strip at its root alone; 15M top bars, d = 850.7, strip 351.4 mm."""
    made = record_of(
        spans=["2.8 m"], supports=["wall 400 mm, fixed", "free"], h="900 mm", b_w="400 mm"
    )
    assert made.entries["hog-1-right/A_sk"]["value"] == pytest.approx(
        0.008 * 2 * 351.4 * 93.9, abs=0.05
    )
    assert made.entries["hog-1-right/skin-area"]["holds"]


def test_given_bars_without_skin_bars_fail() -> None:
    """Bars as built, none at the side faces: the check fails; with those of the design it holds."""
    beam = start(**DEEP)
    run(beam)
    bare = record_of(**DEEP, bar_runs=[typed_row(each) for each in beam.design.runs])
    assert {"sag-2/skin-area", "hog-2-right/skin-area"} <= set(bare.failed)
    whole = record_of(**DEEP, bar_runs=[typed_row(each) for each in beam.design.detailing.bars])
    assert whole.entries["sag-2/n_k"]["value"] == 3
    assert not {name for name in whole.failed if "skin" in name}
