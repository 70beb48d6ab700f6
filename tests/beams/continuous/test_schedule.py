"""Bar schedule, stirrups and quantities against hand calculations and shapely."""

from __future__ import annotations

from dataclasses import replace

import pytest
import shapely

from lineproof.beams.continuous.bending import (
    BEND_DIAMETERS,
    bent_bar,
    closed_stirrup,
    open_stirrup,
    single_leg,
)
from lineproof.beams.continuous.layout import BarRun, BeamOutline, Detailing, Face, StirrupZone
from lineproof.beams.continuous.quantities import quantities
from lineproof.beams.continuous.schedule import over_stock, schedule
from lineproof.beams.continuous.schedule_checks import contradictions
from lineproof.beams.continuous.schedule_served import served
from lineproof.beams.continuous.schedule_stirrups import stirrup_set
from lineproof.beams.continuous.schedule_tables import bar_table, quantity_table, stirrup_table
from lineproof.errors import UserError
from lineproof.standards.a23_3.bars import BARS

from .by_hand import COLUMN, FREE_END, detailing, outline

BEAM = outline()


def bars(*runs: BarRun) -> Detailing:
    """Return a detailing without stirrups."""
    return Detailing(runs, ())


def test_straight_bar() -> None:
    """7436 mm is cut to 7440 mm: 7.44 m x 3.925 kg/m = 29.202 kg."""
    shape = bent_bar("25M", 7436.0)

    assert (shape.cut, shape.mass, shape.code, shape.bends) == (7440.0, 29.202, "00", ())
    assert bent_bar("25M", 7440.0).cut == 7440.0


@pytest.mark.parametrize(
    ("size", "kg_per_m"),
    # CSA G30.18, nominal masses (from memory)
    [("10M", 0.785), ("15M", 1.570), ("20M", 2.355), ("25M", 3.925), ("30M", 5.495),
     ("35M", 7.850), ("45M", 11.775), ("55M", 19.625)],
)  # fmt: skip
def test_nominal_mass(size: str, kg_per_m: float) -> None:
    """A bar of 1 m."""
    assert bent_bar(size, 1000.0).mass == kg_per_m


def test_hook_of_90_degrees() -> None:
    """20M 400R, 1700 mm over the hook: D = 120, r = 60, r + d_b = 79.5 mm.

    Leg 79.5 + 12 x 19.5 = 313.5, rounded up to 320 mm.
    Centre line (1700 - 79.5) + 1.5708 x (60 + 9.75) + (320 - 79.5)
    = 1620.5 + 109.56 + 240.5 = 1970.56 mm, cut to 1980 mm; 1.98 x 2.355 = 4.663 kg.
    """
    shape = bent_bar("20M", 1700.0, hook_start="90")

    assert shape.legs == (("A", 1700.0), ("B", 320.0))
    assert shape.centre_line == pytest.approx(1970.56, abs=0.01)  # printed to 0.01
    assert (shape.cut, shape.mass, shape.code) == (1980.0, 4.663, "11")


def test_weldable_bars_bend_tighter() -> None:
    """20M 400W: D = 100, r = 50. Leg 69.5 + 234 = 303.5, rounded up to 310 mm.

    (1700 - 69.5) + 1.5708 x 59.75 + (310 - 69.5) = 1630.5 + 93.86 + 240.5 = 1964.86 mm.
    """
    shape = bent_bar("20M", 1700.0, hook_end="90", grade="400W")

    assert shape.legs[1] == ("B", 310.0)
    assert shape.centre_line == pytest.approx(1964.86, abs=0.01)


def test_hook_of_180_degrees() -> None:
    """15M 400R, 2000 mm over the hook: r = 50, r + d_b = 66. Tail 4 x 16 = 64, up to 70 mm.

    (2000 - 66) + 3.14159 x (50 + 8) + 70 = 1934 + 182.21 + 70 = 2186.21, cut to 2190 mm.
    The hook is 2 x 66 = 132 mm high. 10M: 4 x 11.3 = 45.2, at least 60 mm.
    """
    shape = bent_bar("15M", 2000.0, hook_end="180")

    assert shape.legs == (("A", 2000.0), ("B", 132.0), ("C", 70.0))
    assert shape.centre_line == pytest.approx(2186.21, abs=0.01)
    assert (shape.cut, shape.code) == (2190.0, "")
    assert bent_bar("10M", 2000.0, hook_end="180").legs[-1] == ("C", 60.0)


def test_hooks_at_both_ends() -> None:
    """25M 400R, 7950 mm: D = 150, r = 75, r + d_b = 100.2.

    Leg 100.2 + 302.4 = 402.6, up to 410.
    7950 - 200.4 + 2 x 1.5708 x 87.6 + 2 x (410 - 100.2) = 7749.6 + 275.20 + 619.6 = 8644.40.
    """
    shape = bent_bar("25M", 7950.0, "90", "90")

    assert shape.legs == (("A", 410.0), ("B", 7950.0), ("C", 410.0))
    assert shape.centre_line == pytest.approx(8644.40, abs=0.01)
    assert (shape.cut, shape.code) == (8650.0, "21")


def test_hooks_of_two_kinds() -> None:
    """15M 400R with a 90 and a 180 degree hook, 3000 mm: leg 66 + 192 = 258, up to 260.

    194 + 91.11 + (3000 - 132) + 182.21 + 70 = 3405.32 mm.
    """
    shape = bent_bar("15M", 3000.0, "180", "90")

    assert shape == bent_bar("15M", 3000.0, "90", "180")
    assert [length for _, length in shape.legs] == [260.0, 3000.0, 132.0, 70.0]
    assert shape.centre_line == pytest.approx(3405.32, abs=0.01)


def test_open_stirrup() -> None:
    """10M, 320 x 560 mm: r = 22.5, r + d_b = 33.8. Hook 33.8 + 67.8 = 101.6, up to 110 mm.

    2 x 76.2 + 2 x (560 - 67.6) + (320 - 67.6) + 4 x 1.5708 x 28.15
    = 152.4 + 984.8 + 252.4 + 176.87 = 1566.47, cut to 1570 mm; 1.57 x 0.785 = 1.232 kg.
    """
    shape = open_stirrup("10M", 560.0, 320.0)

    assert shape.centre_line == pytest.approx(1566.47, abs=0.01)
    assert (shape.cut, shape.mass, shape.code) == (1570.0, 1.232, "")
    assert [length for _, length in shape.legs] == [110.0, 560.0, 320.0, 560.0, 110.0]


def test_closed_stirrup() -> None:
    """10M, 320 x 560 mm: tails 6 x 11.3 = 67.8, up to 70 mm; bends 2 x 135 + 3 x 90 = 540 deg.

    2 x 70 + 2 x 492.4 + 2 x 252.4 + 9.42478 x 28.15 = 140 + 984.8 + 504.8 + 265.31 = 1894.91.
    """
    shape = closed_stirrup("10M", 560.0, 320.0)

    assert shape.centre_line == pytest.approx(1894.91, abs=0.01)
    assert (shape.cut, shape.legs[-1]) == (1900.0, ("C", 70.0))


def test_closed_stirrup_closes() -> None:
    """The chain of a closed stirrup, walked without its hooks, comes back to where it began."""
    shape = closed_stirrup("15M", 700.0, 300.0)
    past = shape.radius + shape.diameter
    outline_sides = [straight + 2 * past for straight in shape.straights[1:-1]]

    assert outline_sides == pytest.approx([700.0, 300.0, 700.0, 300.0])


def test_single_legs() -> None:
    """10M, 560 mm high. Open: 2 x 76.2 + 492.4 + 2 x 44.218 = 733.24, cut to 740 mm.

    Closed: 2 x 70 + 492.4 + 2 x 2.35619 x 28.15 = 140 + 492.4 + 132.65 = 765.05 mm.
    """
    assert single_leg("10M", 560.0, closed=False).centre_line == pytest.approx(733.24, abs=0.01)
    assert single_leg("10M", 560.0, closed=True).centre_line == pytest.approx(765.05, abs=0.01)


def test_all_bars_have_bends() -> None:
    """Each Canadian bar has a bend diameter; a weldable bar never a larger one."""
    assert list(BEND_DIAMETERS.rows) == list(BARS.rows)
    for size in BARS.rows:
        assert BEND_DIAMETERS.number(size, "W") <= BEND_DIAMETERS.number(size, "R")


def test_what_cannot_be_bent_is_refused() -> None:
    """Too short, an unknown grade, a stirrup size without bend diameters."""
    with pytest.raises(UserError, match="too short for its hooks"):
        bent_bar("25M", 150.0, "90", "90")
    with pytest.raises(UserError, match="write for example '400R'"):
        bent_bar("25M", 5000.0, "90", grade="400")
    with pytest.raises(UserError, match="20M"):
        open_stirrup("20M", 560.0, 320.0)
    with pytest.raises(UserError, match="cannot be bent to 60"):
        open_stirrup("10M", 560.0, 60.0)
    with pytest.raises(UserError, match="write 2 or more"):
        stirrup_set(BEAM, StirrupZone(1, 300.0, 800.0, 3, 250.0, "10M", legs=1))


def test_identical_bars_have_one_mark() -> None:
    """Same face, size, length and hooks: one mark, also when turned end for end."""
    made = schedule(
        BEAM,
        bars(
            BarRun("top", 1, 3, "20M", 0.0, 1700.0, hook_start="90", serves="support 1"),
            BarRun("bottom", 1, 2, "20M", 0.0, 1700.0, serves="span 1"),
            BarRun("top", 2, 2, "20M", 20000.0, 21700.0, hook_end="90", serves="support 4"),
            BarRun("top", 1, 4, "20M", 0.0, 1710.0, hook_start="90"),
            BarRun("top", 1, 2, "20M", 0.0, 1700.0, "side face"),
        ),
    )

    assert [run.mark for run in made.detailing.bars] == ["T02", "B01", "T02", "T01", "F01"]
    assert [(item.mark, item.number) for item in made.bars] == [
        ("B01", 2), ("T01", 4), ("T02", 5), ("F01", 2),
    ]  # fmt: skip
    assert made.bars[2].serves == ("support 1", "support 4")


def test_no_bar_is_lost() -> None:
    """The numbers of the lines are those of the runs and zones, and all runs have a mark."""
    given = detailing(BEAM, legs=5)
    made = schedule(BEAM, given)

    assert sum(item.number for item in made.bars) == sum(run.number for run in given.bars)
    assert all(run.mark for run in made.detailing.bars)
    assert [replace(run, mark="") for run in made.detailing.bars] == list(given.bars)
    # 5 legs: an outer stirrup, one inner stirrup and a single leg
    sets = sum(zone.number for zone in given.stirrups)
    assert [item.number for item in made.stirrups] == [sets, sets, sets]
    assert made.sets[0].zone.mark == "S01+S02+S03"


@pytest.mark.parametrize("legs", range(2, 8))
def test_legs_of_a_set(legs: int) -> None:
    """The vertical parts of the pieces count up to the legs of the zone."""
    zone = StirrupZone(1, 300.0, 800.0, 3, 250.0, "10M", legs)
    upright = {"open stirrup": 2, "single leg": 1}
    pieces = stirrup_set(replace(BEAM, b_w=800.0), zone).pieces

    assert sum(upright[shape.form] * count for shape, count in pieces) == legs


def test_inner_stirrup() -> None:
    """Four legs in 320 mm: (320 - 11.3)/3 + 11.3 = 114.2, up to 120 mm outside."""
    zone = StirrupZone(1, 300.0, 800.0, 3, 250.0, "10M", 4)
    (_, (inner, count)) = stirrup_set(BEAM, zone).pieces

    assert (dict(inner.legs)["C"], count) == (120.0, 1)


def test_zone_of_stirrups() -> None:
    """From the right face of support 1 at 225 mm: first 50 mm, last 1425 mm; 12 stirrups.

    12 x 1.232 = 14.784 kg.
    """
    (first, *_) = schedule(BEAM, detailing(BEAM)).sets

    assert (first.first, first.last, first.zone.number) == (50.0, 1425.0, 12)
    assert first.mass == pytest.approx(14.784)


def test_distances_of_a_zone_add_up_as_printed() -> None:
    """22 stirrups at 275 mm over a clear 5960 mm, the outer ones 47.5 mm from face and last one.

    47.5 + 21 x 275 = 5822.5; as 48 and 5822 they did not add up.
    """
    beam = outline((6200.0,), left=COLUMN, right=COLUMN)
    face = beam.faces(1)[0]
    zone = StirrupZone(1, face + 47.5, face + 47.5 + 21 * 275.0, 22, 275.0, "10M", 2)
    (row,) = stirrup_table(schedule(beam, Detailing((), (zone,)))).rows
    spacing, number, first, last = (float(cell) for cell in row[4:8])
    assert (spacing, number, first) == (275, 22, 47.5)
    assert first + (number - 1) * spacing == last


def test_bars_longer_than_stock() -> None:
    """By the cut length: 11 900 mm with two hooks is over 12 m, without hooks it is not."""
    long = BarRun("top", 1, 2, "25M", 0.0, 11900.0, hook_start="90", hook_end="90", mark="T01")

    assert over_stock(bars(replace(long, hook_start="", hook_end="")), "400R") == ()
    (told,) = over_stock(bars(long), "400R")
    # 11 900 - 200.4 + 275.20 + 619.6 = 12 594.4
    assert "T01" in told
    assert "12600 mm" in told


def volume_of(beam: BeamOutline) -> float:
    """Stem and slab over the web, as a polygon of the elevation times the width [m3]."""
    low, high = beam.ends
    cuts = [low, *beam.axes[1:-1], high]
    parts = [
        shapely.box(cuts[index], -depth, cuts[index + 1], 0.0)
        for index, depth in enumerate(beam.depths)
    ]
    return float(shapely.unary_union(parts).area * beam.b_w * 1e-9)


@pytest.mark.parametrize(
    "beam",
    [
        BEAM,
        outline((6000.0,)),
        outline(depths=(620.0, 820.0, 620.0), shape="L"),
        outline((2500.0, 8000.0), left=FREE_END, right=COLUMN, shape="rectangular"),
    ],
)
def test_concrete(beam: BeamOutline) -> None:
    """Against shapely; three parts are each rounded to 0.01 m3."""
    amounts = quantities(beam, schedule(beam, detailing(beam)))

    assert amounts.concrete == pytest.approx(volume_of(beam), abs=0.015)


def test_quantities_by_hand() -> None:
    """Three spans of 24.4 m and 450 mm supports.

    Clear lengths 7150 + 8750 + 7150 = 23.05 m; length 24.85 m.
    Stem 23.05 x 0.38 x 0.48 = 4.20; over supports 1.8 x 0.38 x 0.48 = 0.33;
    slab over web 24.85 x 0.38 x 0.14 = 1.32: 5.85 m3.
    Overhangs 24.85 x 0.14 x (2.3 - 0.38) = 6.68 m3.
    Soffit 23.05 x 0.38 = 8.8; sides 23.05 x 2 x 0.48 = 22.1 m2.
    """
    amounts = quantities(BEAM, schedule(BEAM, detailing(BEAM)))

    assert (amounts.stem, amounts.over_supports, amounts.slab_over_web) == (4.20, 0.33, 1.32)
    assert amounts.concrete == pytest.approx(5.85)
    assert amounts.slab_overhangs == 6.68
    assert (amounts.soffit, amounts.sides, amounts.ends) == (8.8, 22.1, 0.0)


def test_formwork_of_other_sections() -> None:
    """L: sides (0.48 + 0.62) x (6 - 0.45) = 6.1 m2; cantilever end 0.38 x 0.62 = 0.2 m2."""
    edge = outline((6000.0,), shape="L")
    plain = outline((6000.0, 2000.0), shape="rectangular", right=FREE_END)

    assert quantities(edge, schedule(edge, detailing(edge))).sides == 6.1
    amounts = quantities(plain, schedule(plain, detailing(plain)))
    assert amounts.ends == 0.2
    # 2 x 0.62 x (5.55 + 1.775) = 9.083
    assert amounts.sides == 9.1


def test_printed_sums_follow() -> None:
    """The total of each printed column is the sum of what is printed above it."""
    made = schedule(BEAM, detailing(BEAM, legs=4))
    table = bar_table(made)
    amounts = quantities(BEAM, made)
    printed = {row[0]: float(row[1]) for row in quantity_table(amounts).rows}

    *lines, total = table.rows
    assert float(total[-1]) == pytest.approx(sum(float(row[-1]) for row in lines), abs=1e-9)
    for row in lines:
        assert float(row[-1]) == pytest.approx(int(row[2]) * float(row[-2]), abs=0.0501)
    assert printed["Steel"] == float(total[-1])
    assert printed["Steel"] == pytest.approx(
        sum(mass for name, mass in printed.items() if name.startswith(("Steel 1", "Steel 2")))
    )
    assert printed["Concrete of the beam"] == pytest.approx(4.20 + 0.33 + 1.32)
    assert printed["Steel in the concrete of the beam"] == round(printed["Steel"] / 5.85)


def test_tables_have_whole_rows() -> None:
    """Each row has a text for each column, none empty but in the row of totals."""
    made = schedule(BEAM, detailing(BEAM, closed=True, legs=3))
    for table in (bar_table(made), stirrup_table(made)):
        for row in table.rows:
            assert len(row) == len(table.columns)
            assert row[0] == "Total" or all(row)
    assert stirrup_table(made).rows[0][9] == "320 × 560 + 560"


def test_contradictions_are_told() -> None:
    """All at once, each with its place."""
    given = Detailing(
        (
            BarRun("bottom", 1, 3, "25M", -400.0, 8000.0),
            BarRun("top", 1, 3, "45M", -200.0, 4000.0, hook_start="90"),
        ),
        (
            StirrupZone(1, 275.0, 1300.0, 8, 125.0, "10M"),
            StirrupZone(1, 1200.0, 7700.0, 27, 250.0, "10M"),
        ),
    )
    told = " | ".join(contradictions(BEAM, given, "400R"))

    assert "reaches outside the concrete, -225 to 24625 mm" in told
    # 225 + 43.7 + 524.4 = 793.1, up to 800 mm; 620 - 2 x (30 + 11.3) = 537 mm
    assert "leg of 800 mm, more than the 537 mm" in told
    assert "8 at 125 mm do not reach from 275 to 1300 mm" in told
    assert "crosses the face of a support at 7375 mm" in told
    assert "begins before" in told
    assert contradictions(BEAM, detailing(BEAM), "400R") == ()
    ties = StirrupZone(1, -175.0, -25.0, 3, 75.0, "10M")
    assert contradictions(BEAM, Detailing((), (ties,)), "400R") == ()
    (outside,) = contradictions(
        BEAM, Detailing((), (replace(ties, start=-325.0, number=5),)), "400R"
    )
    assert "from -325 to -25 mm reaches outside the concrete" in outside


def test_pieces_of_a_string_are_for_what_they_reach() -> None:
    """Spans of 7.6, 9.2 and 7.6 m: corner bars in pieces, each for its own supports and spans.

    Top: 0 to 4.25 m crosses axis 1 alone, 3.35 to 12.65 m axis 2 at 7.6, 11.75 to 21.05 m axis 3
    at 16.8. Bottom: to 7.95 m, 0.35 m past axis 2, is a lap, not a bar for span 2; to 12.0 m
    covers half of it.
    """
    whole = ", ".join(f"support {number}" for number in range(1, 5))

    def of(face: Face, start: float, end: float, serves: str) -> str:
        return served(outline(), BarRun(face, 1, 2, "20M", start, end, serves=serves))

    assert of("top", -150.0, 4250.0, whole) == "support 1"
    assert of("top", 3350.0, 12650.0, whole) == "support 2"
    assert of("top", 3350.0, 21050.0, whole) == "support 2, support 3"
    assert of("top", -150.0, 4250.0, f"{whole}, holds the stirrups") == (
        "support 1, holds the stirrups"
    )
    assert of("top", 3350.0, 12650.0, f"holds the stirrups, {whole}") == (
        "support 2, holds the stirrups"
    )
    assert of("bottom", -150.0, 7950.0, "spans 1 to 3") == "span 1"
    assert of("bottom", -150.0, 12000.0, "spans 1 to 3") == "spans 1 to 2"
    assert of("top", 20000.0, 21700.0, "support 4") == "support 4"  # as it was said
