"""Bars given at random along random beams: whatever gaps they leave, the package is made.

A gap always fails a check of the cover by bars, and no check of the cover fails without one.
"""

from __future__ import annotations

import random
from typing import Any

import pytest

from lineproof.beams.continuous.resistance_cover import covered
from lineproof.record.recompute import recompute

from .flow import run, start

SPANS = ([7.0], [6.0, 6.0], [7.6, 9.2, 7.6], [2.0, 7.0], [9.0, 3.0, 9.0], [2.0, 7.0, 8.0])
KINDS = ("wall 300 mm", "column 400 mm", "girder 400 mm")


def rows_of(chance: random.Random, length: float, low: float) -> list[dict[str, Any]]:
    """One size a face and at most two runs side by side, so that all fit; anywhere along it."""
    made = []
    for face in ("bottom", "top"):
        size = chance.choice(("15M", "20M"))
        for _ in range(chance.choice((1, 2))):
            ends = sorted(chance.uniform(low, length - 0.05) for _ in range(2))
            start_at = low if chance.random() < 0.5 else ends[0]
            made.append(
                {"face": face, "bars": f"{chance.choice((1, 2))}-{size}",
                 "start": f"{start_at:.2f} m", "end": f"{ends[1] + 0.01:.2f} m"}
            )  # fmt: skip
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
    gaps = covered(beam.design.designed, beam.design.runs).gaps
    failed = [key for key in record.failed if key.startswith("coverage")]
    assert bool(gaps) == bool(failed)
    for gap in gaps:
        name = gap.title
        titles = [record.entries[key].get("title", "") for key in failed]
        assert name in titles
