"""Cut-off points of a beam whose moments are known by hand; supports, check 12c."""

from __future__ import annotations

import math
from dataclasses import replace

import numpy as np
import pytest

from lineproof.beams.analysis.model import PointLoad, UniformLoad
from lineproof.beams.bars import BarLayer
from lineproof.beams.continuous.cutoff import (
    Frame,
    ceil50,
    continuing_length,
    extension,
    floor50,
    full_moment,
    no_further_need,
    zone_at,
)
from lineproof.beams.continuous.cutoff_ends import (
    at_section,
    bottom_side,
    governing_inflection,
    inflections,
    passes,
    top_side,
)
from lineproof.beams.continuous.detailing_bottom import limit_at_support, support_shear
from lineproof.beams.continuous.detailing_data import (
    Designed,
    SectionBars,
    ShearStretch,
    SupportTop,
)
from lineproof.beams.continuous.detailing_top import groups_of, long_of
from lineproof.beams.continuous.forces import Forces
from lineproof.beams.continuous.layout import BarRun
from lineproof.standards.a23_3 import cutoff as clause

from .flow import analysed, run
from .laid import beam_of

FOUR = (BarLayer(4, "25M"),)
TWO = BarRun("bottom", 1, 2, "25M", -150.0, 7150.0)


def simple_beam() -> Designed:
    """7 m, w_f = 40 kN/m between simple supports: M = 20 x (7 x - x^2)."""
    bare = beam_of((7000.0,), ("simple", "simple"), D=20.0, L=10.0)
    shear = (ShearStretch(-200.0, 7200.0, 200e3, 100e3),)
    return replace(
        bare, bars=SectionBars((FOUR,), (SupportTop(), SupportTop()), "15M"), shear=shear
    )


def fixed_beam() -> Designed:
    """8 m, fixed, w_f = 40 kN/m: M = -213.3 at the axes, 106.7 at midspan; zero at 0.2113 l."""
    bare = beam_of((8000.0,), ("fixed", "fixed"), D=20.0, L=10.0)
    return replace(bare, bars=SectionBars((FOUR,), (SupportTop(FOUR), SupportTop(FOUR)), "15M"))


def test_point_of_no_further_need_by_hand() -> None:
    """2-25M carry 180.6 kN.m: 20 x (7 x - x^2) = 180.6 at x = 3.5 - sqrt(12.25 - 9.03) = 1.706 m.

    From both supports alike, on the whole mm on the safe side.
    """
    frame = Frame.of(simple_beam())
    M_r = full_moment(frame.designed, "bottom", 1, [TWO])
    assert M_r == pytest.approx(180.6e6, rel=1e-3)
    exact = 3500 - math.sqrt(3500**2 - M_r / 20)
    for near in ("left", "right"):
        point = no_further_need(frame, "bottom", 1, near, M_r)
        assert point is not None
        assert exact - 1 <= point.t <= exact


def test_top_bars_are_needed_up_to_the_point_of_inflection() -> None:
    """8 m fixed: 8000 x (0.5 - sqrt(1/12)) = 1690.6 mm; rounded away from the support."""
    frame = Frame.of(fixed_beam())
    point = no_further_need(frame, "top", 1, "left", 0.0)
    assert point is not None
    assert 1690.6 <= point.t <= 1691.6


def test_bars_that_carry_all_alone_have_no_point() -> None:
    """Four bars need no others."""
    frame = Frame.of(simple_beam())
    assert no_further_need(frame, "bottom", 1, "left", 300e6) is None
    long = no_further_need(frame, "top", 1, "left", 0.0)
    assert long is not None
    assert long.t == 200.0  # nowhere beyond the face


def test_extension_by_hand() -> None:
    """d 536.1, 12 x 25.2 = 302.4, d_v cot 35 = 482.49 x 1.42815 = 689.1."""
    designed = simple_beam()
    assert extension(designed, "bottom", 1, "left", 1700.0, 25.2) == pytest.approx(689.1, abs=0.1)
    # continuing bars: 766.7 + 536.1
    length = continuing_length(designed, "bottom", 1, "left", [TWO])
    assert length == pytest.approx(766.7 + 536.1, abs=0.2)


def test_ends_stand_on_steps_of_50_on_the_safe_side() -> None:
    assert (floor50(1017.0), floor50(1050.0), ceil50(1017.0), ceil50(1050.0)) == (
        1000.0, 1050.0, 1050.0, 1050.0,
    )  # fmt: skip


def test_end_in_the_tension_zone_by_hand() -> None:
    """V_r 200 kN: low shear below 133.3 kN, at x > 3.5 - 3.333 = 0.167 m; nowhere without it.

    With V_r 100 kN: at 2 m, V = 60 <= 66.7. At 1.6 m V = 76 > 75. At 1.75 m V = 70 <= 75 and
    M = 183.75 kN.m takes 1018 mm2: twice that is more than 1000 mm2, less than 2100 mm2.
    """
    designed = simple_beam()
    assert zone_at(designed, "bottom", 1, "left", 1000.0, [TWO]) == "low shear"
    weak = replace(designed, shear=(ShearStretch(-200.0, 7200.0, 100e3, 50e3),))
    assert zone_at(weak, "bottom", 1, "left", 2000.0, [TWO]) == "low shear"
    assert zone_at(weak, "bottom", 1, "left", 1600.0, [TWO]) == ""
    assert zone_at(weak, "bottom", 1, "left", 1750.0, [TWO]) == ""
    five = replace(TWO, number=5)
    assert zone_at(weak, "bottom", 1, "left", 1750.0, [five]) == "double area"
    thick = [replace(TWO, size=size) for size in ("35M", "45M")]  # 12.10.5: up to 35M
    assert zone_at(weak, "bottom", 1, "left", 1750.0, [five], thick[:1]) == "double area"
    assert zone_at(weak, "bottom", 1, "left", 1750.0, [five], thick) == ""
    assert zone_at(weak, "bottom", 1, "left", 2000.0, [five], thick) == "low shear"
    assert zone_at(replace(designed, shear=()), "bottom", 1, "left", 2000.0, [TWO]) == ""
    assert zone_at(designed, "top", 1, "left", 2000.0, [TWO]) == "compression"


def test_development_at_a_simple_support_by_hand() -> None:
    """V at the axis 140 kN, 2-25M 180.6 kN.m, l_a 200 - 50 = 150: 1.3 x 1290 + 150 = 1827."""
    designed = simple_beam()
    V_f, confined = support_shear(designed, 1, "left")
    assert V_f == pytest.approx(140e3)
    assert confined
    assert limit_at_support(designed, 1, "left", [TWO]) == pytest.approx(1827, abs=2)
    outline = designed.outline
    girder = tuple(replace(s, carrier="girder") for s in outline.supports)
    hung = replace(
        designed, basis=replace(designed.basis, outline=replace(outline, supports=girder))
    )
    assert limit_at_support(hung, 1, "left", [TWO]) == pytest.approx(1440, abs=2)


def test_check_12c() -> None:
    """2-25M continuing, M_r 172.8 kN.m, V_f 260, l_a 150: 815 without, 1014 with 1.3."""
    given = (172.8e6, 260e3, 150.0)
    assert clause.LIMIT.function(*given) == pytest.approx(815, abs=0.5)
    assert clause.LIMIT_CONFINED.function(*given) == pytest.approx(1014, abs=0.5)


def test_inflection_of_the_bottom_bars_by_hand() -> None:
    """8 m fixed: zero moment at 1690.6 mm, V = 40 x (4 - 1.6906) = 92.4 kN."""
    (found,) = inflections(fixed_beam(), 1, "right")
    assert found.t == pytest.approx(1690.6, abs=1)
    assert pytest.approx(92.4e3, rel=1e-3) == found.V
    assert inflections(simple_beam(), 1, "left") == ()


def test_less_shear_nearer_to_the_support_can_govern() -> None:
    """8 m fixed, D = 200 kN/m and L = 200 kN at midspan; bars end at 1600 mm from the axis.

    1.4 D: 0 = -280 x 64/12 + 1120 x - 140 x2: x = 1.6906 m, V = 280 x (4 - 1.6906) = 646.6 kN.
    1.25 D + 1.5 L: 0 = -250 x 64/12 - 300 + (1000 + 150) x - 125 x2: x = 1.7551 m and
    V = 250 x (4 - 1.7551) + 150 = 711.2 kN. The bars reach 90.6 mm past the first point, 155.1 mm
    past the second one: M_r/646.6 + 90.6 is less than M_r/711.2 + 155.1 up to 459 kN.m.
    """
    bare = fixed_beam()
    loads = (UniformLoad("D", 1, 200.0), PointLoad("L", 1, 200e3, 4000.0))
    heavy = replace(bare, forces=Forces.of(bare.forces.beam, loads))
    first, second = inflections(heavy, 1, "left")
    assert (first.t, second.t) == (1755, 1691)
    assert pytest.approx((711.2, 646.6), abs=0.3) == (first.V / 1e3, second.V / 1e3)
    thin = BarRun("bottom", 1, 2, "15M", 1600.0, 6400.0)
    found = governing_inflection(heavy, 1, "left", (thin,), 1600.0)
    assert found is not None
    assert found.point == second
    M_r = full_moment(heavy, "bottom", 1, [thin])
    assert found.longest == pytest.approx(M_r / second.V + 91, abs=0.5)


def test_ends_are_read_from_the_runs() -> None:
    """Two of four bars cut at 1.2 m on the left, at 1.5 m on the right."""
    runs = (TWO, BarRun("bottom", 1, 2, "25M", 1200.0, 5500.0))
    side = bottom_side(simple_beam(), runs, 1, "right")
    assert [ending.t for ending in side.cuts] == [1500.0]
    assert side.kept == (TWO,)
    assert side.t_kept == -150.0
    assert side.continuing(0) == (TWO,)


def test_lapped_bars_are_followed_to_their_last_end() -> None:
    """A bar lapped at a quarter point runs into the support all the same."""
    runs = (
        BarRun("bottom", 1, 2, "25M", -150.0, 2600.0),
        BarRun("bottom", 1, 2, "25M", 1600.0, 7150.0),
    )
    side = bottom_side(simple_beam(), runs, 1, "left")
    assert side.cuts == ()
    assert side.t_kept == -150.0
    assert len(at_section(runs, "bottom", 2000.0)) == 1


def test_stirrup_holders_are_no_bars_of_a_support() -> None:
    """A bar that only laps the corner bars inside a wide support is not one of the support's."""
    corner = BarRun("top", 1, 2, "25M", -150.0, 900.0, hook_start="90")
    holder = BarRun("top", 1, 2, "15M", 150.0, 7850.0)
    side = top_side(fixed_beam(), (corner, holder), 1, "right")
    assert side.runs == (corner,)
    assert side.t_kept == 900.0
    assert not passes(fixed_beam(), side)


def test_a_third_of_the_top_bars_is_long() -> None:
    """4-25M and 6 in the overhangs: 5000 mm2, a third 1667: the corners and the inner two."""
    bare = fixed_beam()
    top = SupportTop(FOUR, 6)
    designed = replace(bare, bars=SectionBars((FOUR,), (top, top), "15M"))
    assert long_of(groups_of(designed, 1)) == 2
    assert long_of(groups_of(bare, 1)) == 1


def test_top_of_a_span_that_hogs_all_along_has_no_inflection() -> None:
    """3 m between 9 m spans under live load on these: tension at the top along the short span."""
    bare = beam_of((9000.0, 3000.0, 9000.0), ("simple",) * 4)
    designed = replace(
        bare,
        bars=SectionBars(
            (FOUR,) * 3, (SupportTop(), SupportTop(FOUR), SupportTop(FOUR), SupportTop()), "15M"
        ),
    )
    M, _ = bare.forces.along(2, np.array([1500.0]))
    assert M.min() < 0
    assert no_further_need(Frame.of(designed), "top", 2, "left", 0.0) is None


def test_top_bars_at_an_assumed_restraint_reach_a_quarter_of_the_clear_span() -> None:
    """l_n = 7600 - 200 - 225 = 7175; 7175/4 = 1793.75 past the face, 1993.75 of the axis: 2000."""
    beam = analysed()
    run(beam, ("flexure", "shear", "anchorage"))
    there = [r for r in beam.design.runs if r.face == "top" and r.start < 0]
    assert {r.place for r in there} == {"web", "overhang"}
    assert min(r.end for r in there) == 2000.0
    parts = {part.key: part for part in beam.sheet.parts}
    entries = parts["anchorage-top-1-right-restraint"].entries
    assert entries["l_ext"].value == pytest.approx(1800.0)
    assert entries["restrained-end"]
    assert entries["development"]
    assert "anchorage-top-1-right-inflection" not in parts
    assert "anchorage-top-2-right-inflection" in parts


def test_top_bars_shorter_than_a_quarter_of_the_clear_span_fail_at_an_assumed_restraint() -> None:
    """1950 - 200 = 1750 mm past the face, where 1793.75 are due."""
    ends = {"start": "-0.15 m", "end": "24.55 m"}
    top = {"face": "top", "bars": "2-25M"} | ends
    runs = [{"face": "bottom", "bars": "4-25M"} | ends, top, top | {"end": "1.95 m"}]
    beam = analysed(bar_runs=[*runs, top | {"bars": "3-25M", "start": "5 m"}])
    run(beam, ("flexure", "shear", "anchorage"))
    entries = beam.sheet.entries_of("anchorage-top-1-right-restraint")
    assert entries["l_ext"].value == pytest.approx(1750.0)
    assert not entries["restrained-end"]
