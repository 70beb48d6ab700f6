"""Laps: their length and place, the stock length, the room for concrete."""

from __future__ import annotations

from dataclasses import replace
from itertools import pairwise

import pytest

from lineproof.beams.bars import BarLayer
from lineproof.beams.continuous.anchorage_record import (
    record_lengths,
)
from lineproof.beams.continuous.beside import crowded, tightest
from lineproof.beams.continuous.detailing_data import Designed, SectionBars, SupportTop
from lineproof.beams.continuous.laps import (
    cut_length,
    lap_between,
    lap_length,
    split,
)
from lineproof.beams.continuous.laps_record import record_crowded, record_laps
from lineproof.beams.continuous.layout import BarRun
from lineproof.errors import UserError

from ..pocket import faults  # noqa: TID252 - one calculator for all tests of beams
from .laid import beam_of, entries, sheet_of, writers_of

FOUR = (BarLayer(4, "25M"),)


def beam(stock: float = 12000.0) -> Designed:
    """Two spans of 9 m, 4-25M at the bottom."""
    bare = beam_of((9000.0, 9000.0), ("elastic",) * 3)
    return replace(
        bare, bars=SectionBars((FOUR, FOUR), (SupportTop(FOUR),) * 3, "15M"), stock=stock
    )


WHOLE = BarRun("bottom", 1, 2, "25M", -150.0, 18150.0, serves="spans 1 to 2")


def test_class_b_on_the_module() -> None:
    """1.3 x 766.7 = 996.7: 1000 mm, half of it 500, at the bottom; 1.3 times that at the top."""
    assert lap_length(beam(), WHOLE) == 1000.0
    assert lap_length(beam(), replace(WHOLE, face="top")) == 1300.0


def test_bars_within_the_stock_stay_whole() -> None:
    short = replace(WHOLE, end=11000.0)
    assert split(beam(), short, [9000.0]) == (short,)


def test_lap_over_the_inner_support() -> None:
    """Centred on the axis at 9 m: 500 mm to either side."""
    first, second = split(beam(), WHOLE, [9000.0])
    assert (first.start, first.end, second.start, second.end) == (-150.0, 9500.0, 8500.0, 18150.0)
    assert first.serves == second.serves == WHOLE.serves


def test_other_places_where_no_support_is_within_reach() -> None:
    """Stock of 8 m from -0.15 m: laps up to 7.35 m, so at 6.6 m, a quarter point.

    From 6.1 m: up to 13.6 m, over the support at 9 m. From 8.5 m: up to 16 m, at 15.6 m.
    """
    pieces = split(beam(8000.0), WHOLE, [9000.0], [2400.0, 6600.0, 11400.0, 15600.0])
    assert [p.end for p in pieces[:-1]] == [7100.0, 9500.0, 16100.0]
    assert all(p.end - p.start <= 8000 for p in pieces)
    assert all(a.end - b.start == 1000 for a, b in pairwise(pieces))


def test_a_lap_anywhere_as_a_last_resort() -> None:
    pieces = split(beam(), WHOLE, [])
    assert [p.end - p.start <= 12000 for p in pieces] == [True, True]
    assert pieces[0].end - pieces[1].start == 1000


def test_hooks_stay_at_their_ends_and_count_for_the_stock() -> None:
    """Legs of 16 diameters, 403 mm each: 12 m of bars between hooks is too long."""
    hooked = replace(WHOLE, hook_start="90", hook_end="90")
    first, second = split(beam(), hooked, [9000.0])
    assert (first.hook_start, first.hook_end, second.hook_start, second.hook_end) == (
        "90", "", "", "90",
    )  # fmt: skip
    assert cut_length(replace(hooked, end=11850.0)) == pytest.approx(12000 + 2 * 16 * 25.2)


def test_thick_bars_are_not_lapped() -> None:
    with pytest.raises(UserError, match="write bars of 35M or smaller"):
        split(beam(), replace(WHOLE, size="45M"), [9000.0])


def test_recorded_laps() -> None:
    """Length against what is laid; without room side by side the bars stand one above the other."""
    designed = beam()
    inner = replace(WHOLE, start=4000.0, end=14000.0)
    runs = (*split(designed, WHOLE, [9000.0]), inner)
    sheet = sheet_of(designed)
    writers = writers_of(sheet, designed)
    record_laps(writers, record_lengths(writers, runs), runs)
    record = sheet.close()
    made = entries(record.data)
    assert made["anchorage-lap-1/lap-length"]["holds"]
    assert made["anchorage-lap-1/lap-room"]["kind"] == "decision"
    assert not made["anchorage-lap-1/lap-room"]["holds"]
    assert "one above the other" in made["anchorage-lap-1/one-above-the-other"]["text"]
    assert list(faults(record.data)) == []


def test_a_lap_under_another_layer_is_told() -> None:
    """Layers of 25M stand 1.4 x 25.2 = 35.3 mm apart; a lapped bar between leaves 35.3 - 25.2 = 10.

    Bars of the second layer that end before the lap, 8.5 to 9.5 m, stand in no one's way.
    """
    designed = beam()
    inner = replace(WHOLE, start=4000.0, end=14000.0)
    for end, text in ((12000.0, "which is NOT enough"), (8400.0, "one above the other.")):
        second = replace(WHOLE, layer=2, start=4000.0, end=end)
        runs = (*split(designed, WHOLE, [9000.0]), inner, second)
        sheet = sheet_of(designed)
        writers = writers_of(sheet, designed)
        record_laps(writers, record_lengths(writers, runs), runs)
        made = entries(sheet.close().data)
        assert not made["anchorage-lap-1/lap-room"]["holds"]
        assert text in made["anchorage-lap-1/one-above-the-other"]["text"]


def test_short_laps_fail() -> None:
    """600 mm where 997 are due."""
    designed = beam()
    runs = (replace(WHOLE, end=9300.0), replace(WHOLE, start=8700.0))
    sheet = sheet_of(designed)
    writers = writers_of(sheet, designed)
    record_laps(writers, record_lengths(writers, runs), runs)
    assert not entries(sheet.close().data)["anchorage-lap-1/lap-length"]["holds"]


def test_bars_of_two_sizes_lap_over_the_development_of_the_thicker() -> None:
    """15M with 25M at the top.

    Lap of 15M: 1.3 x 0.45 x 1.3 x 0.8 x 400/sqrt(35) x 16 = 658; l_d of 25M:
    0.45 x 1.3 x 400/sqrt(35) x 25.2 = 997 mm; 900 mm are laid.
    """
    thin = BarRun("top", 1, 2, "15M", 0.0, 9500.0)
    thick = BarRun("top", 1, 2, "25M", 8500.0, 18000.0)
    assert lap_length(beam(), thin) == 700.0
    assert lap_between(beam(), thin, thick) == lap_between(beam(), thick, thin) == 1000.0
    assert lap_between(beam(), thick, thick) == lap_length(beam(), thick) == 1300.0
    designed = beam()
    sheet = sheet_of(designed)
    writers, runs = writers_of(sheet, designed), (replace(thin, end=9400.0), thick)
    lengths = record_lengths(writers, runs)
    record_laps(writers, lengths, runs)
    made = sheet.entries_of("anchorage-lap-1")
    assert made["l_s"].value == pytest.approx(997, abs=1)
    assert not made["lap-length"]


def test_room_counts_the_bars_that_stand_at_the_lap() -> None:
    """Three further bars end 1 m before the lap: 202.4 - 25.2 - 2 x 25.2 = 126.8 mm are free."""
    designed = beam()
    runs = (*split(designed, WHOLE, [9000.0]), replace(WHOLE, number=3, end=7500.0))
    assert tightest(designed.basis, runs, runs[1].start, runs[0].end).number == 2
    sheet = sheet_of(designed)
    writers = writers_of(sheet, designed)
    record_laps(writers, record_lengths(writers, runs), runs)
    made = sheet.entries_of("anchorage-lap-1")
    assert made["s_cl"].value == pytest.approx(126.8)
    assert made["lap-room"]


def edge() -> Designed:
    """Two spans of 7.6 m, web 380 mm, cover 40 mm, 10M stirrups, 5-15M and 6-15M at the bottom.

    Between the corner bars in the bends of the stirrups: 380 - 2 x (40 + 11.3 + 22.5) = 232.4 mm.
    """
    bare = beam_of((7600.0, 7600.0), ("elastic",) * 3, b_w=380.0, width=450.0)
    bottom = ((BarLayer(5, "15M"),), (BarLayer(6, "15M"),))
    return replace(bare, bars=SectionBars(bottom, (SupportTop((BarLayer(2, "15M"),)),) * 3, "15M"))


CORNERS = BarRun("bottom", 1, 2, "15M", -175.0, 7900.0)
BESIDE = (CORNERS, replace(CORNERS, start=7300.0, end=15375.0))
"""Corner bars lapped over the inner support, 300 mm to either side of its axis."""


def around_the_axis(right: int) -> tuple[BarRun, ...]:
    """Inner bars of both spans end 50 mm from the axis, 3 on the left, some on the right."""
    return (*BESIDE, replace(CORNERS, number=3, end=7550.0), replace(
        CORNERS, number=right, start=7650.0, end=15375.0,
    ))  # fmt: skip


@pytest.mark.parametrize(
    ("right", "places", "clear", "fits"),
    [(4, 6, 30.48, True), (5, 7, 22.73, False)],
)
def test_bars_beside_a_lap_are_counted_along_all_of_it(
    right: int, places: int, clear: float, *, fits: bool
) -> None:
    """At the axis the two lapped bars stand alone, beside it 2 + 4 = 6: 232.4/5 - 16 = 30.48 mm.

    At least 30 mm are due: they fit with the lapped bars one above the other, side by side
    30.48 - 16 = 14.48 mm are left. 2 + 5 = 7 do not fit: 232.4/6 - 16 = 22.73 mm.
    """
    designed, runs = edge(), around_the_axis(right)
    sheet = sheet_of(designed)
    writers = writers_of(sheet, designed)
    record_laps(writers, record_lengths(writers, runs), runs)
    made = sheet.entries_of("anchorage-lap-1")
    assert made["n_b"].value == places
    assert made["s_c"].value == pytest.approx(clear, abs=0.01)
    assert bool(made["bars-fit"]) is fits
    assert made["s_cl"].value == pytest.approx(clear - 16, abs=0.01)
    assert not made["lap-room"]


def test_where_all_bars_are_lapped_both_neighbours_are() -> None:
    """3-15M lapped with 3-15M: 232.4/2 - 16 = 100.2 mm, less a bar from either side: 68.2 mm."""
    designed = edge()
    runs = tuple(replace(run, number=3) for run in BESIDE)
    sheet = sheet_of(designed)
    writers = writers_of(sheet, designed)
    record_laps(writers, record_lengths(writers, runs), runs)
    made = sheet.entries_of("anchorage-lap-1")
    assert made["s_cl"].value == pytest.approx(68.2)


def test_bars_that_pass_each_other_are_counted() -> None:
    """3 and 4 inner bars overlap by 100 mm beside two corner bars that run on: 9 bars.

    232.4/8 - 16 = 13.05 mm; the sections have 6 at most. With the ends apart none is crowded.
    """
    designed = edge()
    whole = replace(CORNERS, end=15375.0)
    left = replace(CORNERS, number=3, end=7650.0)
    right = replace(CORNERS, number=4, start=7550.0, end=15375.0)
    runs = (whole, left, right)
    (row,) = crowded(designed, runs)
    assert (row.start, row.end, row.number) == (7550.0, 7650.0, 9)
    assert crowded(designed, (whole, replace(left, end=7550.0), right)) == []
    sheet = sheet_of(designed)
    writers = writers_of(sheet, designed)
    record_crowded(writers, record_lengths(writers, runs), runs)
    made = sheet.entries_of("anchorage-beside-1")
    assert made["s_c"].value == pytest.approx(13.05)
    assert not made["bars-fit"]
