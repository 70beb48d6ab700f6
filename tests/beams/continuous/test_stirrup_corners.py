"""Bars in the corners of the stirrups (12.13.2), and in the bends of inner ones (12.13.3).

By hand: stirrups every 200 mm from 75 mm of the face of a column of 450 mm stand at 300 mm, 500 mm
and so on from its axis; top bars that end 2.0 m from it stand in those up to 1900 mm, and none in
the stirrup at 2100 mm, whose hooks hold on to nothing.
"""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any

from .flow import record_of, start

ONE_SPAN: Mapping[str, Any] = {
    "spans": ["7.6 m"],
    "supports": ["column 450 mm", "column 450 mm"],
    "shear_method": "simplified",
    "stirrups": [{"span": 1, "spacing": "200 mm"}],
}
BOTTOM = {"face": "bottom", "bars": "4-25M", "start": "-150 mm", "end": "7750 mm"}


def test_a_stretch_without_top_bars_leaves_stirrups_unanchored() -> None:
    made = record_of(
        **ONE_SPAN,
        bar_runs=[
            BOTTOM,
            {"face": "top", "bars": "2-20M", "start": "-150 mm", "end": "2000 mm"},
            {"face": "top", "bars": "2-20M", "start": "5600 mm", "end": "7750 mm"},
        ],
    )
    fewest = made.entries["stirrups/n_cb"]
    assert fewest["value"] == 0
    assert "top, 2.10 m from support 1" in fewest["source"]
    assert "stirrups/stirrup-corners" in made.failed


def test_two_bars_in_the_overhangs_are_in_no_corner() -> None:
    through = {"face": "top", "bars": "2-20M", "start": "-150 mm", "end": "7750 mm"}
    for place, number in (("overhang", 0), ("web", 2)):
        made = record_of(**ONE_SPAN, bar_runs=[BOTTOM, {**through, "place": place}])
        assert made.entries["stirrups/n_cb"]["value"] == number
        assert ("stirrups/stirrup-corners" in made.failed) == (number == 0)


def test_inner_stirrups_without_bars_in_their_bends_are_told() -> None:
    """Four legs and two top bars: two bends of the inner stirrup hold none."""
    through = {"face": "top", "bars": "2-20M", "start": "-150 mm", "end": "7750 mm"}
    four = {**ONE_SPAN, "b_w": "450 mm", "stirrup_legs": 4}
    assert "12.13.3" in {row["clause"] for row in start(**four).sheet.not_covered}
    assert "12.13.3" not in {row["clause"] for row in start(**ONE_SPAN).sheet.not_covered}
    made = record_of(**four, bar_runs=[BOTTOM, through])
    told = made.entries["stirrups/inner-stirrups"]["text"]
    assert "4 legs" in told
    assert "there are 2." in told
    whole = record_of(**four, bar_runs=[BOTTOM, {**through, "bars": "4-20M"}])
    assert "stirrups/inner-stirrups" not in whole.entries
