"""The bars as cut, walked by hand: M_f <= M_r at 1,000 stations a span, anchorage counted.

The walk has its own formulas. It takes from the record what is typed in and the development and
hook lengths as recorded; from the design the runs of bars; from the analysis, which has tests of
its own, the moments of every load case.
"""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any

import pytest

from .flow import MIXED, run, start
from .walk import Walk, uncovered

BEAMS: Mapping[str, Mapping[str, Any]] = {
    "three spans": {},
    "mixed": MIXED,
    "storage, simplified": {"use": "library stack room", "shear_method": "simplified"},
    "rectangular, 500R": {
        "shape": "rectangular", "h_f": None, "floor_weight": "3.4 kPa", "grade": "500R",
    },
    "torsion": {
        "shape": "L", "tributary_width": "1.7 m", "closed_stirrups": True,
        "torques": {"D": "1.4 kN.m", "L": "0.9 kN.m"},
    },
    "two spans of unlike length": {
        "spans": ["8 m", "6.5 m"], "supports": ["wall 300 mm", "column 450 mm", "wall 300 mm"],
        "f_c": "40 MPa",
    },
    "four spans": {
        "spans": ["6 m", "7 m", "7 m", "6 m"], "cover": "40 mm",
        "supports": ["girder 400 mm", *["column 450 mm"] * 3, "girder 400 mm"],
        "loads": [{"type": "L", "span": 2, "point": "60 kN", "at": "2.4 m"}],
    },
}  # fmt: skip


def walked(walk: Walk, span: int) -> list[str]:
    """Say at which stations of a span bars do not cover the moment of some load case."""
    return [
        f"span {span}, {face}, {x:.0f} mm: {M_f / 1e6:.2f} > {M_r / 1e6:.2f} kN.m"
        for face, x, M_f, M_r in uncovered(walk, span)
    ]


@pytest.fixture(scope="module", params=BEAMS, ids=list(BEAMS))
def walk(request: pytest.FixtureRequest) -> Walk:
    """A beam run through the whole flow."""
    beam = start(**BEAMS[request.param])
    return Walk(beam, run(beam).close())


def test_every_station_is_covered(walk: Walk) -> None:
    """1,000 stations a span, both faces, every load case."""
    found = [text for k in range(1, len(walk.beam.inputs.spans) + 1) for text in walked(walk, k)]
    assert found == []
    assert [key for key in walk.record.failed if key.startswith("coverage")] == []


def test_a_bar_cut_shorter_is_found() -> None:
    """The walk is not blind: half of the bars stop before midspan; walk and record fail alike."""
    rows = [
        {"face": "bottom", "bars": "2-25M", "start": "-0.15 m", "end": "24.55 m"},
        {"face": "bottom", "bars": "2-25M", "start": "-0.15 m", "end": "12.0 m"},
        {"face": "bottom", "bars": "2-25M", "start": "16.0 m", "end": "24.55 m"},
        {"face": "top", "bars": "5-25M", "start": "-0.15 m", "end": "24.55 m"},
    ]
    beam = start(bar_runs=rows)
    found = Walk(beam, run(beam).close())
    told = walked(found, 2)
    assert told
    assert all(text.startswith("span 2, bottom, 1") for text in told)
    assert "coverage-bottom/strength" in found.record.failed
    notes = [e for e in found.record.entries.values() if e["id"].startswith("coverage/gap")]
    assert {note["title"] for note in notes} == {"Stretch that fails"}
    assert any(note["text"].startswith("Not enough bottom bars, span 2, ") for note in notes)


def test_a_stretch_without_any_bars_is_printed_and_fails() -> None:
    """From 13.6 to 14.0 m nothing stands below: no resistance there, by the walk and the record."""
    rows = [
        {"face": "bottom", "bars": "4-25M", "start": "-0.15 m", "end": "13.6 m"},
        {"face": "bottom", "bars": "4-25M", "start": "14.0 m", "end": "24.55 m"},
        {"face": "top", "bars": "5-25M", "start": "-0.15 m", "end": "24.55 m"},
    ]
    beam = start(bar_runs=rows)
    found = Walk(beam, run(beam).close())
    assert walked(found, 2)
    assert {"coverage-bottom/strength", "shear-2-along/strain-bars"} <= set(found.record.failed)
    assert found.record.entries["coverage-bottom/M_r"]["value"] == 0
