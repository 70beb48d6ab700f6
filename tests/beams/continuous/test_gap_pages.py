"""How a beam with gaps reads on paper: what stands first, the drawings, lengths that fall short.

The beam is that of ``beam_with_gaps``: 4-20M below stop at 2.30 m and begin again at 3.00 m; 3-25M
over the column reach 0.90 m to each side of it; no stirrups.
"""

from __future__ import annotations

import json
import re
from typing import Any

import pytest

from lineproof.beams.continuous.deliverables import schedule_of
from lineproof.beams.continuous.figure_elevation_cuts import cut_lengths
from lineproof.beams.continuous.figure_elevation_gaps import Short
from lineproof.beams.continuous.figure_elevation_view import view
from lineproof.package import build_package

from .beam_with_gaps import EXISTING, RUNS, Existing
from .flow import CALLS, run, start

GAPS = [
    "Gap in the bottom bars, span 1, 1.77 to 3.54 m from its left axis",
    "Gap in the top bars, span 1, 4.25 to 6.00 m from its left axis",
    "Gap in the top bars, span 2, 0.00 to 1.75 m from its left axis",
]
"""Places as ``test_gaps`` has them by hand; span 2 mirrors span 1."""


def entry(made: Existing, key: str) -> dict[str, Any]:
    """An entry of the record as plain data."""
    return dict(made[2].entries[key])


def texts(figure: dict[str, Any]) -> str:
    """All that is written in a figure."""
    return json.dumps(figure["figure"])


def test_gaps_stand_first_with_their_place(existing: Existing) -> None:
    """On the cover, on the summary, and in the table of cures; then the others as before."""
    (calc,) = build_package([existing[2]]).calcs
    for listed in (calc.failures, calc.failing):
        assert [each.title for each in listed[:3]] == GAPS
        assert [each.leads for each in listed] == [True] * 3 + [False] * (len(listed) - 3)
    assert [row[1] for row in entry(existing, "summary/failing")["rows"][:3]] == GAPS
    places = {each.id: each.place for each in calc.failures}
    assert places["sag-1/strength"] == "Span 1: positive moment"
    assert places["coverage-bottom/strength"] == ""  # the title says where


def test_bars_that_stand_but_are_too_short_are_not_called_a_gap(existing: Existing) -> None:
    title = entry(existing, "coverage-gap-1/bars-tension-side")["title"]
    assert title.startswith("Not enough bottom bars, span 1, 0.15 to 0.2")


def test_where_no_bars_stand_is_told_by_their_ends(existing: Existing) -> None:
    """Bottom bars end at 2.30 m and begin at 3.00 m; top bars meet at 5.10 m."""
    assert entry(existing, "coverage-bottom/no-bars")["text"] == (
        "No bottom bars stand from 2.30 to 3.00 m from the left axis of span 1."
    )
    assert entry(existing, "coverage-top/no-bars")["text"].startswith(
        "At 5.10 m from the left axis of span 1 top bars end and others begin"
    )


def test_the_elevation_shows_gaps_and_the_ends_of_bars_in_them(existing: Existing) -> None:
    beam = existing[0]
    figure = entry(existing, "summary/elevation-1")
    assert all(f"gap {place}" in texts(figure) for place in ("1.77 to 3.54", "4.25 to 6.00"))
    assert "bottom bars not enough: gap 1.77 to 3.54" in figure["alt"]
    made = schedule_of(beam.design)
    seen = view(beam.design.outline, made.detailing, (1, 2))
    first = min((r for r in made.detailing.bars if r.face == "bottom"), key=lambda r: r.start)
    cuts = cut_lengths(seen, first, [Short("bottom", 1, 1770, 3540, "")])
    assert [(cut.axis, cut.end, cut.lower) for cut in cuts] == [(0, 2300, False), (0, -100, True)]


def test_a_section_says_that_it_has_no_bars(existing: Existing) -> None:
    assert "no bottom bars" in texts(entry(existing, "summary/section-b"))
    assert "no top bars" not in texts(entry(existing, "summary/section-b"))
    assert "no bottom bars" not in texts(entry(existing, "summary/section-a"))


def test_bars_in_a_section_lie_as_calculated_though_no_stirrups_stand(existing: Existing) -> None:
    """d = 500 - 30 - 11.3 - 19.5/2 = 448.95: bars lie as if the stirrup of the givens stood."""
    (centre,) = {
        round(each["centre"][1], 2)
        for each in entry(existing, "summary/section-d")["figure"]["shapes"]
        if "centre" in each and each["centre"][1] < 250
    }
    assert centre == pytest.approx(500 - 448.95, abs=0.01)


def test_bars_that_end_before_a_point_are_told_by_how_much(existing: Existing) -> None:
    """0.9D + 1.5L on span 2: M_B = -(17.82*36/8 + 21.6*36/16) = -128.79 kN.m.

    V_A = 17.82*3 - 128.79/6 = 31.995 kN; M = 0 at 2*31.995/17.82 = 3.591 m, 2.409 m from the
    column, taken 2.410 m; 2.410 - 0.900 = 1.510 m. None of the bars pass the point.
    """
    part = "anchorage-top-2-left-inflection"
    for check in ("cut-extension", "length-past-inflection"):
        title = entry(existing, f"{part}/{check}")["title"]
        assert title.endswith(": the bars end 1510 mm before it")
    assert existing[1].entries_of(part)["A_pi"].value == 0
    assert f"{part}/top-past-inflection" in existing[2].failed


def test_without_stirrups_no_number_stands_for_them(existing: Existing) -> None:
    """No index of transverse bars, no use in per cent of no resistance, no empty schedule."""
    assert existing[1].entries_of("anchorage-bar-1")["K_tr"].value == 0
    (zones,) = (e["rows"] for k, e in existing[2].entries.items() if k.endswith("/stirrup-zones"))
    assert {row[3] for row in zones} == {"NO resistance where no bars in tension count."}
    (row,) = entry(existing, "schedule/stirrup-schedule")["rows"]
    assert row[2] == "none"


def test_stirrups_over_a_part_of_a_beam_do_not_shorten_development() -> None:
    """150 mm is closer than the minimum asks, 609 mm; but most of the spans have no stirrups.

    The longer expression holds (12.2.3): 0.6*0.8*400/sqrt(30)*19.5 = 683.6 mm, not 0.75 of it.
    """
    near = [{"span": k, "from": "0 m", "to": "1 m", "spacing": "150 mm"} for k in (1, 2)]
    beam = start(**(EXISTING | {"stirrups": near}), bar_runs=RUNS)
    sheet = run(beam, CALLS[: CALLS.index("anchorage") + 1])
    assert sheet.entries_of("anchorage-bar-1")["l_d"].value == pytest.approx(683.6, abs=0.1)


def test_lengths_of_bars_counted_in_part_are_followed_by_hand(existing: Existing) -> None:
    """L = 1435.47 mm needed is printed as 1435.5, no longer."""
    printed = entry(existing, "hog-2-left-developed/l_d")["printed"]["result"]
    assert re.fullmatch(r"1435\.5", printed)
