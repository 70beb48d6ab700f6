"""Bars of different rows that hand their force over beside each other: a lap, by hand."""

from __future__ import annotations

from typing import Any

import pytest

from lineproof.record import Record, recompute

from ..pocket import faults  # noqa: TID252 - one calculator for all tests of beams
from . import flow

HANGERS = {"face": "top", "bars": "2-15M", "start": "-0.1 m", "end": "7.7 m"}


def row(bars: str, start: str, end: str) -> dict[str, str]:
    return {"face": "bottom", "bars": bars, "start": start, "end": end}


def made(*rows: dict[str, str], **changes: Any) -> Record:
    """Return the record of a span of 7.6 m with bars and stirrups as built."""
    given: dict[str, Any] = {
        "spans": ["7.6 m"], "supports": ["wall 300 mm"] * 2, "b_w": "700 mm", "spacing": "2 m",
        "use": "office", "bar_runs": [*rows, HANGERS],
        "stirrups": [{"span": 1, "spacing": "200 mm"}],
    }  # fmt: skip
    return flow.record_of(**(given | changes))


LEFT = row("3-25M", "-0.1 m", "4.0 m")


def part(record: Record) -> list[str]:
    return [key for key in record.entries if key.startswith("anchorage-handed-over")]


@pytest.mark.parametrize(("start", "overlap"), [("3.2 m", 800), ("2.9 m", 1100)])
@pytest.mark.parametrize("right", ["4-25M", "3-30M"])
def test_rows_that_meet_at_midspan_are_lapped(start: str, overlap: int, right: str) -> None:
    """All bars end at midspan: class B, 1.3 l_d of 25M, whatever the others are.

    l_d = 0.45 x 400/sqrt(32) x 25.2 = 801.9 mm, 1.3 of it 1042 mm. 30M need 951 mm for their yield
    and 951 x 1500/2100 = 680 mm for the force of 3-25M, less.
    An overlap of 800 mm is too short by 1042/800 = 1.30, one of 1100 mm is enough.
    """
    record = made(LEFT, row(right, start, "7.7 m"))
    check = record.entries["anchorage-handed-over-1/lap-length"]
    assert check["holds"] == (overlap > 1042)
    assert check["utilisation"] == pytest.approx(1042.4 / overlap, rel=1e-3)
    assert ("anchorage-handed-over-1/lap-length" in record.failed) == (overlap < 1042)
    assert list(faults(record.data)) == []
    assert recompute(record) == []


def test_bars_that_are_cut_where_others_do_are_no_lap() -> None:
    """4-25M run through and carry the span alone: what ends beside them hands over nothing."""
    through = row("4-25M", "-0.1 m", "7.7 m")
    record = made(through, row("1-20M", "-0.1 m", "4.0 m"), row("2-20M", "3.6 m", "7.7 m"))
    assert record.entries["sag-1/strength"]["holds"]
    assert part(record) == []


def test_rows_that_meet_over_a_support_are_no_lap() -> None:
    """Over the middle support the bottom is pressed: bars of both spans overlap by 400 mm there."""
    record = made(
        row("3-25M", "-0.1 m", "7.8 m"), row("4-25M", "7.4 m", "15.3 m"),
        spans=["7.6 m"] * 2, supports=["wall 300 mm", "column 450 mm", "wall 300 mm"],
        stirrups=[{"span": k, "spacing": "200 mm"} for k in (1, 2)],
    )  # fmt: skip
    assert part(record) == []
