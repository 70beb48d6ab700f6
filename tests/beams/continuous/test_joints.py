"""What stands in the joints of the end supports: hooks, ties around them, hanger stirrups."""

from __future__ import annotations

import pytest

from lineproof.beams import ContinuousBeam
from lineproof.beams.continuous.deliverables import schedule_of
from lineproof.beams.continuous.schedule_tables import stirrup_table
from lineproof.beams.continuous.summary_supports import support_rows

from .flow import start

CALLS = ("loads", "spans", "analysis", "flexure", "shear", "anchorage")


@pytest.fixture(scope="module")
def beam() -> ContinuousBeam:
    """The gallery beam between girders, its top bars 20M in the web and in the overhangs."""
    made = start()
    for call in CALLS:
        getattr(made, call)()
    return made


def test_ties_do_not_hold_hooks_outside_them(beam: ContinuousBeam) -> None:
    """2-20M within the web are tied, 2-20M in the overhangs are not: the page says both.

    Side and top cover are 30 + 11.3 mm, below 60: 12.5.4 asks for the ties, which earn nothing, so
    that 100 x 19.5/sqrt(32) = 344.7 mm hold for both.
    """
    there = [(r.number, r.place) for r in beam.design.runs if r.hook_start and r.face == "top"]
    assert sorted(there) == [(2, "overhang"), (2, "web")]
    web = beam.sheet.entries_of("anchorage-end-1-hook-20m")
    assert str((web["hook-ties"].extra or {})["title"]).startswith("Ties around the hooks within")
    beside = beam.sheet.entries_of("anchorage-end-1-hook-20m-overhang")
    assert "NOT tied here" in str(beside["ties-in-joint"].source)
    assert "hook-ties" not in beside
    assert "ties-in-joint" not in web
    lengths = [hook["l_dh"].value for hook in (web, beside)]
    assert lengths == pytest.approx([344.7, 344.7], abs=0.05)


def test_girders_are_told_what_their_joints_need(beam: ContinuousBeam) -> None:
    """The reaction of 165 kN: 165 000/(0.85 x 400) = 486 mm2, 3 stirrups of 2 x 100 mm2.

    Hooks of 20M: 3 x 19.5 = 58.5 mm, on the module of 5 mm 55 mm.
    """
    assert beam.sheet.entry("support-1/R_f").value == pytest.approx(165e3, abs=500)
    rows = [row.cells for row in support_rows(beam.design)]
    assert [support for support, _ in rows] == ["1", "1", "4", "4"]
    assert rows[0][1].startswith("3 hanger stirrups 10M with 2 legs")
    assert rows[1][1].endswith("20M in the overhangs, at most 55 mm apart")


def test_ties_around_hooks_are_named_and_are_no_stirrups(beam: ContinuousBeam) -> None:
    """From -350 mm, 50 mm inside the girder of 400 mm: (400 - 50)/55 = 6 ties in each girder.

    The shear stirrups stand 90 mm apart at the least: the first tie is further from them.
    """
    table = stirrup_table(schedule_of(beam.design))
    at = [dict(zip(table.columns, row, strict=True)) for row in table.rows]
    ties = [row for row in at if row["Form"] == "open, ties around hooks"]
    assert [(row["Span"], row["Number"], row["Spacing, mm"]) for row in ties] == [
        ("1", "6", "55"), ("3", "6", "55"),
    ]  # fmt: skip
    assert [row["First, mm from left face"] for row in ties] == ["-350", "7250"]
    assert beam.sheet.entry("stirrups/s").value == 90.0
    assert "ties-closer" in beam.sheet.entries_of("stirrups")


def test_without_hooks_outside_the_ties_nothing_is_left_to_the_joint() -> None:
    """Columns carry the beam from below: no hanger stirrups; no slab, no overhangs."""
    made = start(
        supports=["column 400 mm", "column 450 mm", "column 450 mm", "column 400 mm"],
        shape="rectangular",
        h_f=None,
        floor_weight="3.4 kPa",
    )
    for call in CALLS:
        getattr(made, call)()
    assert list(support_rows(made.design)) == []
