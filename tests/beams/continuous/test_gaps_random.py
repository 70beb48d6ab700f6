"""Bars given at random along random beams: whatever gaps they leave, the package is made.

A gap always fails a check of the cover by bars, and no check of the cover fails without one. Where
the gaps are is compared with a walk along the beam that has formulas of its own.
"""

from __future__ import annotations

import random
from collections.abc import Sequence
from typing import Any

import pytest

from lineproof.beams.continuous.beam import ContinuousBeam
from lineproof.beams.continuous.resistance_cover import Gap, covered
from lineproof.record import Record
from lineproof.record.entry import CHECK
from lineproof.record.recompute import recompute

from .flow import run, start
from .walk import Walk, resistance, uncovered

SPANS = ([7.0], [6.0, 6.0], [7.6, 9.2, 7.6], [2.0, 7.0], [9.0, 3.0, 9.0], [2.0, 7.0, 8.0])
KINDS = ("wall 300 mm", "column 400 mm", "girder 400 mm")
APART = 20.0
"""Stations of the walk and of the cover stand less than this apart [mm]."""


def rows_of(chance: random.Random, length: float, low: float) -> list[dict[str, Any]]:
    """One size a face and at most two runs side by side, so that all fit; anywhere along it.

    The two have different numbers of bars: else they might be lapped, which the walk counts
    otherwise.
    """
    made = []
    for face in ("bottom", "top"):
        size, number = chance.choice(("15M", "20M")), chance.choice((1, 2))
        for _ in range(chance.choice((1, 2))):
            ends = sorted(chance.uniform(low, length - 0.05) for _ in range(2))
            start_at = low if chance.random() < 0.5 else ends[0]
            made.append(
                {"face": face, "bars": f"{number}-{size}", "start": f"{start_at:.2f} m",
                 "end": f"{ends[1] + 0.01:.2f} m"}
            )  # fmt: skip
            number = 3 - number
    return made


@pytest.mark.parametrize("seed", range(10))
def test_no_gap_stops_the_package(seed: int) -> None:
    chance = random.Random(seed)  # noqa: S311 - test data
    spans = chance.choice(SPANS)
    supports = [chance.choice(KINDS) for _ in range(len(spans) + 1)]
    low = -0.1
    if spans[0] == 2.0:
        supports[0], low = "free", 0.05
    inputs: dict[str, Any] = {
        "spans": [f"{span} m" for span in spans], "supports": supports,
        "bar_runs": rows_of(chance, sum(spans), low),
        "shear_method": chance.choice(("general", "simplified")),
    }  # fmt: skip
    beam = start(**inputs)
    record = run(beam).close()
    assert recompute(record) == []
    gaps = agreed(beam, record)
    failed = [key for key in record.failed if key.startswith("coverage")]
    for gap in gaps:
        titles = [record.entries[key].get("title", "") for key in failed]
        assert gap.title in titles


@pytest.mark.parametrize(
    ("spans", "bars"),
    [([7.0], "5-25M"), ([6.0, 6.0], "5-25M"), ([7.6, 9.2, 7.6], "5-25M"), ([5.0, 6.5], "4-25M")],
)
@pytest.mark.parametrize("method", ["general", "simplified"])
def test_long_bars_leave_no_gap(spans: list[float], bars: str, method: str) -> None:
    """Bars from end to end, hooked there: neither the walk nor the cover finds a gap."""
    hooks = {"hook_start": "90", "hook_end": "90"}
    ends = {"start": "-0.15 m", "end": f"{sum(spans) + 0.15:.2f} m"}
    beam = start(
        spans=[f"{span} m" for span in spans], supports=["column 400 mm"] * (len(spans) + 1),
        bar_runs=[{"face": face, "bars": bars, **ends, **hooks} for face in ("bottom", "top")],
        shear_method=method,
    )  # fmt: skip
    assert agreed(beam, run(beam).close()) == ()


def agreed(beam: ContinuousBeam, record: Record) -> Sequence[Gap]:
    """Return the gaps in the bars of a beam, found alike by the walk and by its checks."""
    gaps = covered(beam.design.designed, beam.design.runs).gaps
    assert bool(gaps) == any(key.startswith("coverage") for key in record.failed)
    holding = [e for e in record.entries.values() if e["kind"] == CHECK and e["holds"]]
    assert [e["id"] for e in holding if e.get("title", "").startswith("Gap")] == []
    walk = Walk(beam, record)
    for span in range(1, len(beam.inputs.spans) + 1):
        for face, x, _, _ in uncovered(walk, span):
            assert any(
                (gap.face, gap.span) == (face, span) and gap.start - APART < x < gap.end + APART
                for gap in gaps
            ), (span, face, x)
    for gap in gaps:
        at = gap.at
        start_at, end = beam.design.outline.faces(gap.span)
        if start_at <= at.x <= end:
            M_r = resistance(walk, gap.span, gap.face, at.x)
            assert at.M_r == pytest.approx(M_r, rel=1e-6, abs=1.0)
            assert at.by_tension or at.M_f > M_r
    return gaps
