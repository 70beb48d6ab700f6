"""What shear is told of bars and supports, by hand: bars at a lap, an assumed restraint."""

from __future__ import annotations

from dataclasses import replace

import numpy as np
import pytest

from lineproof.beams.bars import BarLayer
from lineproof.beams.continuous.bars_counted import record_area
from lineproof.beams.continuous.cutoff import Frame
from lineproof.beams.continuous.detailing_data import SectionBars, ShearStretch, SupportTop
from lineproof.beams.continuous.detailing_meeting import Reach, allowed
from lineproof.beams.continuous.layout import BarRun
from lineproof.beams.continuous.resistance import stand
from lineproof.beams.continuous.resistance_demand import NO_SHEAR, stretch_at, stretches_at
from lineproof.beams.continuous.shear_stretches import (
    BarsOver,
    bars_over,
    span_numbers,
    weaker_of,
)
from lineproof.beams.steps import Steps
from lineproof.sheet import Sheet

from .flow import CALLS, run, start
from .laid import beam_of


@pytest.mark.parametrize("more", [0.0, 800.0])
def test_lapped_bars_count_as_one_all_along(more: float) -> None:
    """2-25M lapped with 2-25M over class B, 1.3 x 766.7 = 996.7 mm, or more: 1000 mm2 everywhere.

    The one changes over to the other at the middle of the overlap. At d_v from the face, 682 mm
    from the axis, the bars reach back 832 mm, more than l_d.
    """
    four = (BarLayer(4, "25M"),)
    bare = beam_of((7000.0,), ("simple", "simple"), D=20.0, L=10.0)
    designed = replace(bare, bars=SectionBars((four,), (SupportTop(), SupportTop()), "15M"))
    overlap = 1.3 * 0.45 * 400 / 35**0.5 * 25.2 + more
    runs = [
        BarRun("bottom", 1, 2, "25M", -150.0, 3000.0 + overlap),
        BarRun("bottom", 1, 2, "25M", 3000.0, 7150.0),
    ]
    found = bars_over(designed, stand(designed, runs), "bottom", 1)
    assert (found[0].start, found[-1].end) == (0.0, 7000.0)
    assert [over.area for over in found] == pytest.approx([1000.0] * len(found))
    middle = 3000.0 + overlap / 2
    assert [share.run for over in found if over.end <= middle + 1 for share in over.shares] == [
        runs[0] for over in found if over.end <= middle + 1
    ]


def over_a_short_lap() -> tuple[BarsOver, ...]:
    """What counts of 2-25M lapped over 300 mm, from 3.0 to 3.3 m of a span of 7 m."""
    four = (BarLayer(4, "25M"),)
    bare = beam_of((7000.0,), ("simple", "simple"), D=20.0, L=10.0)
    designed = replace(bare, bars=SectionBars((four,), (SupportTop(), SupportTop()), "15M"))
    runs = [
        BarRun("bottom", 1, 2, "25M", -150.0, 3300.0),
        BarRun("bottom", 1, 2, "25M", 3000.0, 7150.0),
    ]
    return bars_over(designed, stand(designed, runs), "bottom", 1)


def test_bars_lapped_too_little_count_as_far_as_each_is_developed() -> None:
    """2-25M over 300 of 996.7 mm: at the begin of the lap 300/996.7 = 0.30 of the first.

    249.2 mm, a quarter, from either end: 50.8/996.7 = 0.05 of each, together 100 mm2 of 1000.
    """
    found = over_a_short_lap()
    quarter = 1.3 * 0.45 * 400 / 35**0.5 * 25.2 / 4
    areas = {(round(over.start), round(over.end)): over.area for over in found}
    assert areas[round(3300 - 2 * quarter), 3000] == pytest.approx(300.0)
    assert areas[round(3300 - quarter), round(3000 + quarter)] == pytest.approx(100.0)


def test_the_place_where_bars_of_a_stretch_are_the_least_is_said() -> None:
    """From 3.051 to 3.249 m each bar reaches 3300 - 3249.2 = 50.8 mm at least: 0.05 of 996.7 mm."""
    found = over_a_short_lap()
    (over,) = [each for each in found if round(each.start) == 3051]
    sheet = Sheet("B1", "Bars")
    with sheet.part("bars", "Bars"):
        record_area(Steps(sheet, {}), "A_s", over)
    told = (
        "least from 3.05 to 3.25 m from support 1: 51 mm to the end of the bars, of 997 mm needed"
    )
    assert sheet.entries_of("bars")["r_t1"].source.origin == told
    assert sheet.entries_of("bars")["A_s"].value == pytest.approx(4 * 500 * 0.05)


def test_an_assumed_restraint_adds_its_moment_over_the_span() -> None:
    """Girders at the ends: w l^2/24 over l, on the outer sides of the end spans alone.

    D 20.3736 kN/m (slab 10.416, web 4.3776, 1.8 x 3.1), L 4.8 x 3.1 = 14.88 kN/m:
    w_f = 1.25 x 20.3736 + 1.5 x 14.88 = 47.787 kN/m; 47.787 x 7.6/24 = 15.1326 kN.
    """
    beam = start()
    run(beam, CALLS[:4])
    design = beam.design
    numbers = span_numbers(design.model, design.designed, design.runs)
    found = [x for each in numbers for x in (each.left.restraint, each.right.restraint)]
    assert found == pytest.approx([15132.6, 0, 0, 0, 0, 15132.6], abs=0.1)


def test_a_symmetrical_beam_resists_alike_at_mirrored_places() -> None:
    """Clear spans of 7175 mm are no multiple of 50 mm: stations go from both faces to midspan."""
    beam = start()
    run(beam, CALLS[: CALLS.index("shear") + 1])
    designed = beam.design.designed
    total = designed.outline.axes[-1]
    found = {(round(s.start, 3), round(s.end, 3)): (s.V_r, s.V_s, s.theta) for s in designed.shear}
    mirrored = {
        (round(total - s.end, 3), round(total - s.start, 3)): (s.V_r, s.V_s, s.theta)
        for s in designed.shear
    }
    assert found == mirrored


def test_the_weaker_of_two_divisions_at_each_place() -> None:
    """0 to 4 m and 4 to 6 m against 1 to 5 m: the least of each quantity where both stand."""
    first = [ShearStretch(0, 4000, 300.0, 200.0, 33.0), ShearStretch(4000, 6000, 250.0, 150.0)]
    second = [ShearStretch(1000, 5000, 280.0, 210.0, 31.0)]

    made = [(s.start, s.end, s.V_r, s.V_s, s.theta) for s in weaker_of(first, second)]

    assert made == [
        (0, 1000, 300, 200, 33), (1000, 4000, 280, 200, 31), (4000, 5000, 250, 150, 31),
        (5000, 6000, 250, 150, first[1].theta),
    ]  # fmt: skip
    assert weaker_of((), second) == tuple(second)


def test_where_stretches_meet_the_weaker_counts_whatever_the_last_bits() -> None:
    """Stirrups of 100 kN up to 4 m, of 150 kN behind; with the same stirrups the lower V_r."""
    bare = beam_of((7000.0,), ("simple", "simple"), D=20.0, L=10.0)
    weak, strong = ShearStretch(0, 4000, 200.0, 100.0), ShearStretch(4000, 7000, 250.0, 150.0)
    alike = ShearStretch(4000, 7000, 190.0, 100.0)
    places = [4000 - 1e-9, 4000.0, 4000 + 1e-9]
    for other, expected in ((strong, weak), (alike, alike)):
        designed = replace(bare, shear=(weak, other))
        assert [stretch_at(designed, x) for x in places] == [expected] * 3
        assert stretches_at(designed, np.array(places)) == [expected] * 3
        assert stretch_at(designed, 4001.0) == other
    assert stretch_at(replace(bare, shear=(weak,)), 4001.0) == NO_SHEAR


def test_bars_made_longer_end_where_a_tension_zone_allows_it() -> None:
    """Short bars moved to 1.40 m: up to 1.72 m from the axis the shear is too high to end there.

    The next place on the module of 50 mm is 1.75 m; where none is allowed they are as the others.
    """
    beam = start()
    run(beam, CALLS[:3])
    designed = beam.design.designed
    axis = designed.outline.axes[1]
    weak = [ShearStretch(0, axis + 1720, 1.0, 1.0), ShearStretch(axis + 1720, 1e5, 1e9, 1e9)]
    found = Reach(3000, 1400)

    for shear, short in ((weak, 1750), (weak[:1], 3000)):
        there = replace(designed, shear=tuple(shear))
        assert allowed(Frame.of(there), 2, "right", (), found) == Reach(3000, short)
