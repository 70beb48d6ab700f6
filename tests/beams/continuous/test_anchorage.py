"""Development lengths and hooks in numbers: the independent checks 12, 12b, by hand."""

from __future__ import annotations

from dataclasses import replace

import pytest

from lineproof.beams.bars import BarLayer
from lineproof.beams.continuous.anchorage import Bar, available, develop, hook_at, tie_spacing
from lineproof.beams.continuous.anchorage_record import (
    record_hook,
    record_lengths,
)
from lineproof.beams.continuous.detailing_data import Basis, SectionBars, Stirrups, SupportTop
from lineproof.beams.continuous.layout import BarRun
from lineproof.errors import UserError

from ..pocket import faults  # noqa: TID252 - one calculator for all tests of beams
from .laid import PAIR_24, beam_of, sheet_of, writers_of

ONE = ((7000.0,), ("elastic", "elastic"))


def base(expression: str = "table", **more: object) -> Basis:
    """The base beam of the checks: 350 x 600, cover 40, 10M at 225, f'c 35, f_y 400."""
    made = beam_of(*ONE, **more).basis  # type: ignore[arg-type]
    return replace(made, expression=expression)  # type: ignore[arg-type]


BOTTOM = Bar("bottom", "web", 1, "25M", 4, 600.0)
TOP = Bar("top", "web", 1, "25M", 4, 600.0)


def test_table_check_12() -> None:
    """25M: 0.45 x 400/sqrt(35) x 25.2 = 767; top bars 1.3 times: 997; class B 1.3 x 766.7 = 997."""
    bottom, top = develop(base(), BOTTOM), develop(base(), TOP)
    assert bottom.l_d == pytest.approx(767, abs=0.6)
    assert top.l_d == pytest.approx(997, abs=0.6)
    assert bottom.lap == pytest.approx(997, abs=0.6)
    assert bottom.short
    assert top.top
    assert not bottom.top


def test_longer_expression_check_12() -> None:
    """Without minimum stirrups all along: 0.60 x 400/sqrt(35) x 25.2 = 1022."""
    bare = replace(base(), stirrups=Stirrups("10M", 2, 225.0, minimum=False))
    assert develop(bare, BOTTOM).l_d == pytest.approx(1022, abs=0.6)


def test_general_expression_by_hand() -> None:
    """Corner bars in the bend of the stirrup: radius 22.5 against half of 25.2 = 12.6.

    s_c = (350 - 2 x (40 + 11.3 + 22.5))/3 - 25.2 = 42.267; c/c 67.467, two thirds 44.978 < 63.9;
    K_tr = 200 x 400/(10.5 x 225 x 4) = 8.466;
    1.15 x 400 x 500/((44.978 + 8.466) x 5.91608) = 727.4.
    Check 12 has the bars at 74.1 c/c without the bend and gives 672 mm (in the catalogue's tests).
    """
    made = develop(base("general"), BOTTOM)
    assert made.general == pytest.approx(727.4, abs=0.1)
    assert made.l_d == made.general
    assert made.lap == pytest.approx(1.3 * 727.4, abs=0.2)
    assert develop(base(), BOTTOM).l_d == pytest.approx(766.7, abs=0.1)


def test_small_bars_and_the_least_length() -> None:
    """20M: 0.8 x 0.45 x 400/5.91608 x 19.5 = 474.6; 10M: 275.0 counts as 300, its lap 357.6."""
    assert develop(base(), replace(BOTTOM, size="20M")).l_d == pytest.approx(474.6, abs=0.1)
    small = develop(base(), replace(BOTTOM, size="10M"))
    assert small.l_d == 300.0
    assert small.lap == pytest.approx(1.3 * 0.8 * 0.45 * 400 / 35**0.5 * 11.3, rel=1e-12)


def test_shallow_beam_has_no_top_bars() -> None:
    """300 mm of fresh concrete: 376.5 - 40 - 11.3 - 25.2 = 300 is not more than 300."""
    assert not develop(base(h=376.5), replace(TOP, h=376.5)).top
    assert develop(base(h=377.0), replace(TOP, h=377.0)).top


def test_close_bars_take_the_longer_expression() -> None:
    """6-25M in 350: (350 - 147.6)/5 - 25.2 = 15.3 < 1.4 x 25.2 = 35.3."""
    assert not develop(base(), replace(BOTTOM, number=6)).short


def test_bars_in_the_overhang() -> None:
    """2 a side in 350 mm: 350/2 - 25.2 = 149.8 >= 50.4, over a slab of 150 mm: no top bars."""
    bar = Bar("top", "overhang", 1, "25M", 4, 600.0, room=350.0)
    made = develop(base(), bar)
    assert made.s_c == pytest.approx(149.8)
    assert not made.top
    assert made.l_d == pytest.approx(767, abs=0.6)
    assert not develop(base(), replace(bar, number=12)).short


def test_hooks_check_12b() -> None:
    """100 x 25.2/sqrt(35) = 426; covers of 51 mm: 12.5.4 asks for ties, which earn nothing.

    In a column of 500 mm, 75 mm wider on each side than the web, the side cover is 126 mm: 0.7 of
    it; ties at 3 bar diameters, for the cover of 51 mm at the top, 0.8: 238.5, without them 298.
    """
    bare = beam_of(*ONE)
    assert hook_at(bare, 1, "25M").l_hb == pytest.approx(426, abs=0.5)
    assert hook_at(bare, 1, "25M").l_dh == pytest.approx(425.96, abs=0.1)
    wide = replace(bare, breadths={1: 500.0})
    assert hook_at(wide, 1, "25M").l_dh == pytest.approx(0.7 * 0.8 * 425.96, abs=0.1)
    assert hook_at(wide, 1, "25M").l_dh / 0.8 == pytest.approx(298, abs=0.5)
    assert hook_at(wide, 2, "25M").l_dh == pytest.approx(425.96, abs=0.1)


def test_tail_cover_below_50_earns_nothing() -> None:
    """End cover 40 mm: no factor 0.7 however wide the column."""
    made = replace(beam_of(*ONE), breadths={1: 900.0}, end_cover=40.0)
    assert hook_at(made, 1, "25M").l_dh == pytest.approx(340.8, abs=0.1)


def test_cover_of_60_needs_no_ties() -> None:
    """Cover 50 + 11.3 = 61.3 at all faces: 0.7 without ties: 298."""
    bare = beam_of(*ONE)
    deep = replace(bare, basis=replace(bare.basis, outline=replace(bare.outline, cover=50.0)))
    made = hook_at(deep, 1, "25M")
    assert not made.tied
    assert made.l_dh == pytest.approx(298, abs=0.5)


def test_ties_stand_on_steps_of_5() -> None:
    """3 x 25.2 = 75.6: 75; 3 x 16 = 48: 45; 3 x 35.7 = 107.1: 105."""
    assert [tie_spacing(d_b) for d_b in (25.2, 16.0, 35.7)] == [75.0, 45.0, 105.0]


def test_hooks_of_the_2024_edition_are_refused() -> None:
    """Their expression is not known here."""
    with pytest.raises(UserError, match="Anchor the bars straight"):
        hook_at(beam_of(*ONE, pair=PAIR_24), 1, "25M")


def test_length_in_the_support() -> None:
    """400 mm less 50 mm of cover."""
    assert available(beam_of(*ONE), 1) == 350.0


@pytest.mark.parametrize("expression", ["table", "general"])
@pytest.mark.parametrize("shape", ["T", "rectangular"])
def test_recorded_lengths_are_the_numbers(expression: str, shape: str) -> None:
    """At 1e-9, both faces, two sizes, an overhang; every line follows from what is printed."""
    bare = beam_of(*ONE, shape=shape)
    layers = (BarLayer(4, "25M"), BarLayer(2, "20M"))
    designed = replace(
        bare,
        basis=replace(bare.basis, expression=expression),  # type: ignore[arg-type]
        bars=SectionBars((layers,), (SupportTop(layers, 4), SupportTop(layers, 4)), "15M"),
    )
    runs = [
        BarRun("bottom", 1, 4, "25M", 0.0, 7000.0), BarRun("bottom", 2, 2, "20M", 0.0, 7000.0),
        BarRun("top", 1, 4, "25M", -100.0, 2000.0), BarRun("top", 1, 2, "15M", 1500.0, 5000.0),
    ]  # fmt: skip
    if shape == "T":
        runs.append(BarRun("top", 1, 4, "25M", -100.0, 1500.0, place="overhang"))
    sheet = sheet_of(designed)
    writers = writers_of(sheet, designed)
    lengths = record_lengths(writers, runs)
    assert len(lengths) == len(runs)
    for bar, found in lengths.items():
        made = develop(designed.basis, bar)
        for symbol, number in (("l_d", made.l_d), ("l_s", made.lap), ("l_d0", made.l_d0)):
            assert found[symbol].value == pytest.approx(number, rel=1e-9)
    assert list(faults(sheet.close().data)) == []


def test_ties_earn_nothing_for_bars_in_the_overhangs_alone() -> None:
    """Check 12b without the factor 0.8: 298 mm; bars of the web beside them keep it: 238.5 mm."""
    bare = replace(beam_of(*ONE), breadths={1: 500.0})
    top = SupportTop((BarLayer(2, "25M"),), 2)
    spread = replace(bare, bars=SectionBars((), (top, SupportTop()), "15M"))
    assert hook_at(spread, 1, "25M", outside=True).l_dh == pytest.approx(0.7 * 425.96, abs=0.1)
    assert hook_at(spread, 1, "25M").l_dh == pytest.approx(0.7 * 0.8 * 425.96, abs=0.1)
    sheet = sheet_of(spread)
    with sheet.part("hook", "Hook"):
        place = record_hook(writers_of(sheet, spread), {}, 1, "25M", 75.0, outside=True)
        assert place["l_dh"].value == pytest.approx(0.7 * 425.96, abs=0.1)
        assert place["k_ht"].value == 1.0
    with sheet.part("web", "Hook"):
        place = record_hook(writers_of(sheet, spread), {}, 1, "25M", 75.0)
        assert place["l_dh"].value == pytest.approx(0.7 * 0.8 * 425.96, abs=0.1)
    assert "hook-ties" not in sheet.entries_of("hook")
    assert sheet.entries_of("web")["hook-ties"].value == (75.0, pytest.approx(75.6))
