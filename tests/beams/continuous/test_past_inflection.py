"""A third of the top bars passes the point of inflection (12.12.2), shown where bars run on too."""

from __future__ import annotations

from dataclasses import replace
from typing import Any

import pytest

from lineproof import beams

from .edge_beam import edge, failing
from .flow import CALLS, analysed, start, typed_row


def made(beam: beams.ContinuousBeam) -> beams.ContinuousBeam:
    """Return the beam with its chapters up to the anchorage recorded."""
    for call in CALLS[:-2]:
        getattr(beam, call)()
    return beam


def test_bars_that_run_on_are_a_third_or_others_pass_too() -> None:
    """Edge beam: of 8-15M over support 2 two run on, 400 < 1600/3 = 533 mm2; four end past it.

    They end 7600 - 4550 = 3050 mm from the axis of support 2; no load case has tension at the top
    more than 2463 mm from it in span 1 (whole mm). l_pi = max(560.7, 12 x 16,
    7150/16 = 447) = 560.7 mm, there are 3050 - 2463 = 587 mm. Over support 1 two of four, 400 mm2,
    are more than 800/3 by themselves.
    """
    beam = made(edge())
    x = 7600.0 - 2463
    M = [beam.model.forces.pairs(1, at)[0].min() for at in (x - 1, x, x + 1)]
    assert M[0] > 0 > M[2]
    entries = beam.sheet.entries_of("anchorage-top-2-left-third")
    assert "6-15M pass" in entries["bars-text"].source.text
    assert entries["length-past-inflection"].value == (pytest.approx(560.7), 3050 - 2463)
    assert entries["top-past-inflection"].value == (pytest.approx(1600 / 3), 1200)
    assert "run on" in beam.sheet.entry("anchorage-top-2-left-inflection/through").source.text
    alone = beam.sheet.entries_of("anchorage-top-1-right-inflection")
    assert alone["top-past-inflection"].value == (pytest.approx(800 / 3), 400)


def test_bars_that_end_before_the_longest_count_where_they_pass() -> None:
    """6-20M over support 2 and two in the overhangs: 2400/3 = 800 mm2, the two longest are 600.

    Those are typed 1050 mm longer than they would be chosen, the bars that they are lapped with
    1000 mm shorter. The four others end 4250 mm from the axis, 921 mm past the point of inflection;
    569 are needed.
    """
    given = ["2-15M", "6-20M", "6-20M", "2-15M"]
    chosen = analysed(top_bars=given).design.runs
    longer: dict[tuple[str, float], dict[str, Any]] = {
        ("2-15M", -150.0): {"end": 3050.0},
        ("2-20M", 3350.0): {"start": 2300.0},
    }
    rows = [
        typed_row(replace(run, **longer.get((f"{run.number}-{run.size}", run.start), {})))
        for run in chosen
    ]
    beam = made(start(bar_runs=rows))
    assert failing(beam.sheet) == []
    entries = beam.sheet.entries_of("anchorage-top-2-left-third")
    assert entries["top-past-inflection"].value == (pytest.approx(2400 / 3), 6 * 300)
    assert entries["length-past-inflection"].value == (pytest.approx(568.95), 4250 - 3329)
