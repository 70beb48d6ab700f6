"""Resistance of bars as detailed, by hand at single stations; gaps are found where they are."""

from __future__ import annotations

from dataclasses import replace

import numpy as np
import pytest

from lineproof.beams.bars import BarLayer
from lineproof.beams.continuous.detailing_data import (
    Designed,
    SectionBars,
    ShearStretch,
    SupportTop,
)
from lineproof.beams.continuous.layout import BarRun
from lineproof.beams.continuous.resistance import (
    area_for,
    effective_depth,
    lap_pairs,
    lapped,
    moment_of,
    provide,
    stand,
)
from lineproof.beams.continuous.resistance_cover import covered
from lineproof.beams.continuous.resistance_demand import Side, demand_at, end_tension, largest

from .laid import beam_of

FOUR = (BarLayer(4, "25M"),)


def simple_beam(**more: object) -> Designed:
    """7 m between simple supports 400 mm wide, D 20, L 10: w_f = 1.25 x 20 + 1.5 x 10 = 40 kN/m."""
    bare = beam_of((7000.0,), ("simple", "simple"), D=20.0, L=10.0, **more)  # type: ignore[arg-type]
    return replace(bare, bars=SectionBars((FOUR,), (SupportTop(), SupportTop()), "15M"))


def bottom(start: float, end: float, number: int = 4, **more: object) -> BarRun:
    """Bottom bars 25M."""
    return BarRun("bottom", 1, number, "25M", start, end, **more)  # type: ignore[arg-type]


def test_bars_count_in_proportion_to_their_development() -> None:
    """l_d 766.7: at 400 mm from the end 0.5217 of 2000 mm2, at 800 mm all; nothing outside."""
    designed = simple_beam()
    standing = stand(designed, [bottom(0.0, 7000.0)])
    x = np.array([0.0, 400.0, 800.0, 3500.0, 6600.0, 7000.0])
    made = provide(designed, standing, "bottom", x, [1] * 6)
    l_d = 0.45 * 400 / 35**0.5 * 25.2
    assert made.A.tolist() == pytest.approx([0, 2000 * 400 / l_d, 2000, 2000, 2000 * 400 / l_d, 0])


def test_resistance_of_the_base_beam_check_5a() -> None:
    """b 350, d 536.1: a = 680000/(18.143 x 350) = 107.09; 680000 x (536.1 - 53.54) = 328.1e6."""
    designed = simple_beam(shape="rectangular")
    made = provide(
        designed, stand(designed, [bottom(0.0, 7000.0)]), "bottom", np.array([3500.0]), [1]
    )
    assert made.d[0] == pytest.approx(600 - 40 - 11.3 - 12.6)
    assert made.M_r[0] == pytest.approx(328.1e6, rel=2e-4)
    # check 5a has d = 535: 327.4 kN.m
    M = moment_of(designed, np.array([2000.0]), np.array([535.0]), np.array([350.0]))
    assert M[0] == pytest.approx(327.4e6, rel=2e-4)


def test_resistance_of_a_tee_check_5b() -> None:
    """b 900, h_f 100, b_w 300, d 600, A_s 7000: 1220.4 kN.m; and back to the area."""
    bare = simple_beam()
    outline = replace(bare.outline, b_w=300.0, h_f=100.0)
    designed = replace(bare, basis=replace(bare.basis, outline=outline))
    M = float(moment_of(designed, np.array([7000.0]), np.array([600.0]), np.array([900.0]))[0])
    assert pytest.approx(1220.4e6, rel=1e-4) == M
    assert area_for(designed, M, 600.0, 900.0) == pytest.approx(7000.0, rel=1e-9)


def test_two_layers_have_their_own_depths() -> None:
    """4-25M / 2-20M: 63.9 and 51.3 + 25.2 + 35.28 + 9.75 = 121.53 from the bottom.

    (2000 x 63.9 + 600 x 121.53)/2600 = 77.20; the layers lie 1.4 x 25.2 = 35.28 apart.
    """
    designed = simple_beam()
    layers = (BarLayer(4, "25M"), BarLayer(2, "20M"))
    assert effective_depth(designed, layers, 600.0) == pytest.approx(600 - 77.20, abs=0.01)


def test_like_bars_that_are_lapped_count_as_one() -> None:
    """Over a lap of class B both rise over the length of the lap: 0.25 + 0.75 of 2 bars."""
    designed = simple_beam()
    lap = 1.3 * 0.45 * 400 / 35**0.5 * 25.2
    first, second = bottom(-150.0, 3000.0 + lap, 2), bottom(3000.0, 7150.0, 2)
    assert lapped(first, second)
    x = 3000.0 + np.array([0.0, 0.25, 0.5, 1.0]) * lap
    made = provide(designed, stand(designed, [first, second]), "bottom", x, [1] * 4)
    assert made.A.tolist() == pytest.approx([1000.0] * 4)


def test_a_bar_is_lapped_with_one_other_at_each_end() -> None:
    """Inner bars that end beside the lap of two corner bars are none of it."""
    runs = [bottom(-150.0, 4450.0, 2), bottom(3150.0, 7150.0, 2), bottom(3700.0, 6000.0, 2)]
    assert lap_pairs(runs) == ((0, 1),)
    standing = stand(simple_beam(), runs)
    assert [s.lap_start for s in standing] == [False, True, False]


def test_a_piece_of_a_bar_laps_the_next_piece_of_it_and_not_like_bars_that_end_there() -> None:
    """Two corner bars in two pieces; two like inner bars end beside the lap, further inside."""
    corner, inner = "support 1, support 2", "support 2"
    runs = [
        BarRun("top", 1, 2, "15M", 0.0, 6550.0, serves=corner),
        BarRun("top", 1, 2, "15M", 2000.0, 6850.0, serves=inner),
        BarRun("top", 1, 2, "15M", 5850.0, 12000.0, serves=corner),
    ]
    assert lap_pairs(runs) == ((0, 2),)


def test_long_overlap_is_no_lap() -> None:
    """4 m of 25M side by side, 159 diameters, are two sets of bars; 3 m may be a lap."""
    assert not lapped(bottom(0.0, 6000.0, 2), bottom(2000.0, 8000.0, 2))
    assert lapped(bottom(0.0, 5000.0, 2), bottom(2000.0, 7000.0, 2))


def test_tension_with_shear_by_hand_check_9b() -> None:
    """At 1 m from the axis: V = 40 x 2.5 = 100 kN, M = 40 x (3.5 x 1 - 0.5) = 120 kN.m.

    d_v = 0.9 x 536.1 = 482.49; F = 120/0.48249 + (100 - 15) x cot 35 = 248.71 + 121.39 = 370.1 kN,
    V_s being 30 kN.
    """
    designed = replace(simple_beam(), shear=(ShearStretch(-200.0, 7200.0, 200e3, 30e3),))
    made = demand_at(designed, 1, np.array([1000.0]))
    assert made.bottom.M[0] == pytest.approx(120e6)
    assert made.bottom.F[0] == pytest.approx(370.1e3, rel=2e-4)
    assert made.top.F[0] == 0.0


def test_tension_is_capped_at_the_largest_moment() -> None:
    """Beside midspan M alone gives 40 x 3.5^2/2 = 245 kN.m; F is what that needs."""
    designed = simple_beam()
    assert largest(designed, "bottom", 1, "left") == pytest.approx(245e6)
    made = demand_at(designed, 1, np.array([3000.0])).bottom
    A = area_for(designed, 245e6, 536.1, 1900.0)
    assert made.free[0] > made.cap[0] == pytest.approx(340 * A)
    assert made.F[0] == made.cap[0]


def test_force_at_an_end_support_check_9b() -> None:
    """(260 - 0.5 x 207.8) x cot 35 = 222.9 kN: here V at the face 40 x 3.3 = 132 kN, V_s 100."""
    designed = replace(simple_beam(), shear=(ShearStretch(-200.0, 7200.0, 200e3, 100e3),))
    assert end_tension(designed, 1) == pytest.approx((132 - 50) * 1.42815e3, rel=1e-4)
    given = replace(designed, end_forces={1: 222.9e3})
    assert end_tension(given, 1) == 222.9e3


def test_bars_all_along_cover_a_simple_beam() -> None:
    """Hooked over the support so that they are developed at the face."""
    run = bottom(-150.0, 7150.0, hook_start="90", hook_end="90")
    found = covered(simple_beam(), [run])
    assert found.holds
    assert found.worst.ratio < 1
    assert found.worst.case.combination == "1.25D + 1.5L"


def test_a_gap_is_found_where_it_is() -> None:
    """No bars from 3 to 4 m: nothing counts there, and next to it too little is developed."""
    designed = simple_beam()
    left, right = bottom(-150.0, 3000.0, hook_start="90"), bottom(4000.0, 7150.0, hook_end="90")
    found = covered(designed, [left, right])
    assert not found.holds
    (gap,) = found.gaps
    assert (gap.face, gap.span) == ("bottom", 1)
    assert gap.start < 3000
    assert gap.end > 4000
    assert "no bars count there" in str(gap)
    # l_d 767: of the 2000 mm2 about 1300 are needed at 3 m - 0.35 l_d at the earliest
    assert gap.start > 3000 - 767


def test_a_gap_between_the_design_stations_is_found() -> None:
    """Two bars end at midspan where four are needed: worst at midspan, ratio about 2 x M/M_r."""
    designed = simple_beam()
    runs = [
        bottom(-150.0, 7150.0, 2, hook_start="90", hook_end="90"),
        bottom(-150.0, 3500.0, 2, hook_start="90"),
    ]
    found = covered(designed, runs)
    assert not found.holds
    # M_r of 2-25M: a = 340000/(18.143 x 1900) = 9.86; 340000 x (536.1 - 4.93) = 180.6e6
    beyond = next(s for s in found.stations if s.face == "bottom")
    assert beyond.ratio == pytest.approx(245 / 180.6, rel=5e-3)
    assert beyond.local == pytest.approx(3500, abs=40)


def test_free_end_asks_nothing_inside_its_cover() -> None:
    """A cantilever's bars start 50 mm from its tip; the first 100 mm ask nothing."""
    designed = beam_of((2000.0, 7000.0), ("free", "elastic", "elastic"))
    designed = replace(
        designed,
        bars=SectionBars((FOUR, FOUR), (SupportTop(), SupportTop(FOUR), SupportTop(FOUR)), "15M"),
    )
    found = covered(designed, [
        BarRun("top", 1, 4, "25M", 50.0, 8950.0, hook_end="90"),
        BarRun("bottom", 1, 4, "25M", 1850.0, 9150.0, hook_end="90"),
    ])  # fmt: skip
    assert found.holds


def test_lapped_bars_never_count_more_than_one_where_the_overlap_is_longer_than_the_lap() -> None:
    """Overlap of 2000 mm: in its middle each bar counts half, though a lap takes 1000 mm."""
    runs = [bottom(-150.0, 4500.0), bottom(2500.0, 7150.0)]
    standing = stand(simple_beam(), runs)
    x = np.linspace(2500.0, 4500.0, 21)
    parts = sum(bars.developed(x) for bars in standing)
    assert parts == pytest.approx(np.ones(21))
    assert standing[0].developed(np.array([3500.0])) == pytest.approx(0.5)


def test_no_place_is_sought_beside_a_station_where_no_bars_would_do() -> None:
    """The tension passes its cap of 2 halfway between 1 at x = 2 and 3 at x = 3, not before."""
    none = np.zeros(4, dtype=np.intp)
    side = Side(np.ones(4), none, np.array([1.0, np.inf, 1.0, 3.0]), none, np.full(4, 2.0))
    with np.errstate(all="raise"):
        assert side.crossings(np.arange(4.0)) == [2.5]
