"""Given bars: read, refused with what to write, and failing where they leave a gap."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import replace
from typing import Any

import pytest

from lineproof.beams.bars import BarLayer
from lineproof.beams.continuous.cutoff import sag_at
from lineproof.beams.continuous.detailing import lay_bars
from lineproof.beams.continuous.detailing_given import beside_gap, check_layers, section_bars_of
from lineproof.beams.continuous.layout import BarRun
from lineproof.beams.continuous.resistance_cover import covered
from lineproof.beams.continuous.typed_runs import read_runs
from lineproof.errors import UserError
from lineproof.standards.codes import CodePair, code_pair

from .laid import PAIR_19, PAIR_24, beam_of, three_spans

Row = dict[str, Any]
DESIGNED = beam_of((7000.0,), ("simple", "simple"), D=20.0, L=10.0)
BASIS, PAIR = DESIGNED.basis, code_pair(PAIR_19)
GOOD: Row = {"face": "bottom", "bars": "2-25M", "start": "-0.15 m", "end": "7.15 m"}


def row(**changes: Any) -> Row:
    """The good row, changed."""
    return GOOD | changes


def given_runs(rows: list[Row], pair: CodePair = PAIR) -> tuple[BarRun, ...]:
    """Read rows for the one span and check its layers."""
    runs = read_runs("bar_runs", rows, BASIS.outline, pair)
    check_layers(runs, BASIS)
    return runs


def test_a_row_is_read() -> None:
    (run,) = given_runs([row(hook_start="90", serves="span 1")])
    assert run == BarRun("bottom", 1, 2, "25M", -150.0, 7150.0, hook_start="90", serves="span 1")


@pytest.mark.parametrize(
    ("changes", "words"),
    [
        ({"bars": "2-26M"}, "write '2-25M'"),
        ({"bars": "two"}, "write '2-25M'"),
        ({"face": "below"}, "write one of 'bottom', 'top'"),
        ({"layer": 3}, "write one of 1, 2"),
        ({"start": "0.5"}, "has no unit"),
        ({"end": "9 m"}, "9000 mm is outside the beam, which goes from -200 to 7200 mm"),
        ({"start": "5 m", "end": "5 m"}, "write start below end"),
        ({"end": "3 m", "hook_end": "90"}, "not at an end support or a free end"),
        ({"hook_start": "135"}, "write one of '', '90', '180'"),
        ({"place": "overhang"}, "no slab beside the bottom bars"),
        ({"cover": "40 mm"}, "'cover' is not known; write one of face, bars"),
        ({"bars": "8-25M"}, "8 bars up to 25M stand side by side"),
    ],
)
def test_bad_rows_say_what_to_write(changes: Row, words: str) -> None:
    with pytest.raises(UserError) as told:
        given_runs([row(**changes)])
    assert words in str(told.value)


def test_all_faults_at_once() -> None:
    rows = [row(bars="x"), row(start="9 m", end="8 m"), {"face": "top"}]
    with pytest.raises(UserError) as told:
        given_runs(rows)
    text = "\n".join(told.value.faults)
    assert "bar run 1, bars" in text
    assert "bar run 2: starts at 9000 mm" in text
    assert "bar run 2, start: 9000 mm is outside" in text
    assert "bar run 3: bars is missing" in text
    with pytest.raises(UserError, match="none given"):
        given_runs([])


def test_hooks_of_the_2024_edition_are_refused() -> None:
    with pytest.raises(UserError, match="write straight bars"):
        given_runs([row(hook_start="90")], code_pair(PAIR_24))


def test_sections_are_read_from_the_runs() -> None:
    designed = three_spans()
    runs = lay_bars(designed)
    places = [sag_at(designed, span) for span in (1, 2, 3)]
    assert section_bars_of(runs, designed.outline, "15M", places) == designed.bars


def test_two_sizes_stand_in_one_layer_and_three_are_refused() -> None:
    rows = [GOOD, row(bars="1-20M")]
    runs = given_runs(rows)
    ((layer,),) = section_bars_of(runs, BASIS.outline, "15M", [3500.0]).bottom
    assert (str(layer), layer.count, layer.area) == ("2-25M + 1-20M", 3, 1300)
    runs = given_runs([*rows, row(bars="1-15M")])
    with pytest.raises(UserError, match="25M, 20M, 15M stand in layer 1 of the bottom bars"):
        section_bars_of(runs, BASIS.outline, "15M", [3500.0])


def test_where_no_bars_stand_the_nearest_are_known() -> None:
    """2-25M end at 3 m and 2-20M begin at 4.2 m: of 3.5 m the 25M are nearer, of 3.9 m the 20M.

    Also where the 20M are short, so that the middle of the 25M is further away.
    """
    short = row(bars="2-20M", start="4.2 m", end="5 m")
    runs = given_runs([row(end="3 m"), short])
    assert beside_gap(runs, BASIS.outline, 1, 3500.0) == (BarLayer(2, "25M"),)
    runs = given_runs([row(end="3 m"), row(bars="2-20M", start="4.2 m")])
    assert section_bars_of(runs, BASIS.outline, "15M", [3500.0]).bottom == ((),)
    assert section_bars_of(runs, BASIS.outline, "15M", [2900.0]).bottom == ((BarLayer(2, "25M"),),)
    assert beside_gap(runs, BASIS.outline, 1, 3500.0) == (BarLayer(2, "25M"),)
    assert beside_gap(runs, BASIS.outline, 1, 3900.0) == (BarLayer(2, "20M"),)
    assert beside_gap((), BASIS.outline, 1, 3500.0) == ()


def spoiled(change: Callable[[BarRun], BarRun]) -> bool:
    """Whether the bars of the three-span beam cover it once one kind of run is changed."""
    designed = three_spans()
    return covered(designed, tuple(change(run) for run in lay_bars(designed)), 300).holds


def test_bars_taken_away_or_cut_leave_gaps() -> None:
    assert spoiled(lambda run: run)
    assert not spoiled(lambda r: replace(r, number=1) if r.serves == "support 2" else r)
    assert not spoiled(lambda r: replace(r, end=r.end - 1500) if r.serves == "support 2" else r)
    assert not spoiled(
        lambda r: replace(r, start=r.start + 200, hook_start="") if r.hook_start else r
    )
    assert not spoiled(lambda r: replace(r, size="15M") if r.serves == "span 1" else r)
