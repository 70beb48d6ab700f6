"""Sections at a station and bending shapes: what is drawn is what the data say."""

from __future__ import annotations

from dataclasses import replace
from itertools import combinations, pairwise, product
from typing import Any

import pytest
from shapely import LineString, Point, box

from lineproof.beams.continuous.bending import BentShape, bent_bar
from lineproof.beams.continuous.figure_bends import COLUMNS, bends_figures
from lineproof.beams.continuous.figure_chain import chain
from lineproof.beams.continuous.figure_cross_section import section_at, sections_of
from lineproof.beams.continuous.figure_cross_section_steel import steel_at, web_circles
from lineproof.beams.continuous.layout import BarRun, BeamOutline, Detailing, Face, StirrupZone
from lineproof.beams.continuous.schedule import BarItem, schedule
from lineproof.drawing import Arc, Arrow, Circle, Dimension, Figure, Line, Polyline
from lineproof.drawing.paper import lower

from .by_hand import COLUMN, FREE_END, detailing, outline
from .print_checks import assert_readable, plain, words_of

SOLID = frozenset({"concrete", "bars", "stirrups", "dimensions", "text"})
BEAM = outline()
SKIN = BarRun("bottom", 1, 8, "10M", 0.0, 24000.0, "side face")


def marked(beam: BeamOutline, *more: BarRun, **changes: Any) -> Detailing:
    """Return the bars of a beam with their marks."""
    given = detailing(beam, **changes)
    return schedule(beam, Detailing((*given.bars, *more), given.stirrups)).detailing


def circles_of(figure: Figure) -> list[Circle]:
    """Return the bars of a section."""
    return [s for s in figure.shapes if isinstance(s, Circle) and s.layer == "bars"]


def dimension(figure: Figure, name: str) -> float:
    """Return the measured length of the dimension called ``name``."""
    (found,) = [
        s for s in figure.shapes if isinstance(s, Dimension) and plain(s).split(" = ")[0] == name
    ]
    return found.measured


@pytest.mark.parametrize(
    ("kind", "legs", "closed", "depth"),
    [*product(("T", "L", "rectangular"), (2, 3, 4), (False, True), (450.0, 620.0, 1100.0))],
)
def test_sections_are_readable(kind: str, legs: int, closed: bool, depth: float) -> None:  # noqa: FBT001
    """T, L and rectangle; two to four legs; with side bars; no text touched by anything."""
    beam = outline(shape=kind, depths=(depth,) * 3)
    for _, _, figure in sections_of(beam, marked(beam, SKIN, legs=legs, closed=closed)):
        assert_readable(figure, SOLID)


@pytest.mark.parametrize(("kind", "b_w"), [("T", 1800.0), ("L", 900.0), ("rectangular", 1800.0)])
def test_shallow_wide_sections_are_readable(kind: str, b_w: float) -> None:
    """A band of 350 mm by 1800 mm is 14 mm tall on paper, less than the names beside it need."""
    width = b_w if kind == "rectangular" else b_w + 1400.0
    beam = replace(outline(shape=kind, depths=(350.0,) * 3, b_w=b_w), widths=(width,) * 3)
    for _, _, figure in sections_of(beam, marked(beam, SKIN)):
        assert_readable(figure)


@pytest.mark.parametrize("x", [225.0, 1000.0, 3800.0, 7375.0, 7600.0, 7850.0, 12200.0, 24000.0])
def test_bars_of_a_station(x: float) -> None:
    """As many circles as bars whose run holds the station, each of its diameter."""
    given = marked(BEAM)
    present = [run for run in given.bars if run.start <= x <= run.end]
    drawn = sorted(2 * circle.radius for circle in circles_of(section_at(BEAM, given, x)))

    assert drawn == pytest.approx(sorted(run.diameter for run in present for _ in
                                         range(run.number)))  # fmt: skip


def test_effective_depths() -> None:
    """Bottom 25M in one layer: 620 - 30 - 11.3 - 12.6 = 566.1 mm.

    Top at support 2: 3-25M at 566.1; 2-25M a layer below, clear distance 1.4 x 25.2 = 35.3 mm:
    566.1 - 25.2 - 35.28 = 505.62; 4-15M in the overhangs at 620 - 41.3 - 8 = 570.7.
    (1500 x 566.1 + 1000 x 505.62 + 800 x 570.7)/3300 = 548.89 mm.
    """
    given = marked(BEAM)

    assert dimension(section_at(BEAM, given, 3800.0), "d") == pytest.approx(566.1)
    at_support = section_at(BEAM, given, 7375.0, tension="top")
    assert dimension(at_support, "d") == pytest.approx(548.89, abs=0.01)
    assert dimension(at_support, "h") == 620.0
    assert dimension(at_support, "bw") == 380.0
    assert dimension(at_support, "hf") == 140.0


def test_layers_stand_apart_by_the_aggregate() -> None:
    """40 mm aggregate: 1.4 x 40 = 56 mm between layers; 566.1 - 25.2 - 56 = 484.9 mm."""
    steel = steel_at(BEAM, marked(BEAM), 7375.0, 40.0)
    heights = sorted({round(c.centre[1], 1) for run, c in web_circles(steel) if run.face == "top"})

    assert heights == [484.9, 566.1]


@pytest.mark.parametrize("number", range(2, 8))
def test_bars_stand_inside_the_stirrup(number: int) -> None:
    """Every bar lies within the inner edge of the stirrup, symmetric, outer bars in the bends."""
    beam = outline((7600.0,))
    given = Detailing(
        (
            BarRun("bottom", 1, number, "25M", 0.0, 7600.0),
            BarRun("bottom", 1, 2, "20M", 0.0, 7600.0),
            BarRun("bottom", 2, 2, "20M", 0.0, 7600.0),
        ),
        (StirrupZone(1, 275.0, 7275.0, 29, 250.0, "10M"),),
    )
    circles = [c for _, c in web_circles(steel_at(beam, given, 3800.0, 20.0))]
    inner = box(41.3 + 22.5, 41.3 + 22.5, 380 - 63.8, 620 - 63.8).buffer(22.5)

    assert len(circles) == number + 4
    for circle in circles:
        # a polygon of a circle lies within it; 0.01 mm for the polygon of the bend
        assert inner.buffer(0.01).covers(Point(circle.centre).buffer(circle.radius))
    first = sorted(c.centre[0] for c in circles if c.centre[1] < 60.0)
    assert first[0] + first[-1] == pytest.approx(380.0)
    assert {c.radius for c in circles if c.centre[0] in (first[0], first[-1])} <= {12.6, 9.75}
    assert max(c.radius for c in circles if c.centre[0] == first[0]) == 12.6


def test_thickest_bars_stand_in_the_corners() -> None:
    """2-25M and 2-20M in one layer: 25M outside, each resting on the stirrup."""
    beam = outline((7600.0,))
    given = Detailing(
        (
            BarRun("bottom", 1, 2, "20M", 0.0, 7600.0),
            BarRun("bottom", 1, 2, "25M", 0.0, 7600.0),
        ),
        (StirrupZone(1, 275.0, 7275.0, 29, 250.0, "10M"),),
    )
    circles = sorted(
        (c for _, c in web_circles(steel_at(beam, given, 3800.0, 20.0))), key=lambda c: c.centre
    )

    assert [c.radius for c in circles] == [12.6, 9.75, 9.75, 12.6]
    assert [c.centre[1] - c.radius for c in circles] == pytest.approx([41.3] * 4)


STRING = (
    BarRun("bottom", 1, 2, "20M", 6000.0, 9000.0),  # inner bars
    BarRun("bottom", 1, 2, "20M", 0.0, 4250.0),
    BarRun("bottom", 1, 2, "20M", 3350.0, 12000.0),
)
"""Corner bars lapped over 900 mm at 3.80 m, and bars between them further on, written first."""


def laid_at(
    x: float, runs: tuple[BarRun, ...] = STRING, b_w: float = 380.0
) -> dict[int, list[float]]:
    """Return where the bars of each run lie across the web at a station, to 0.1 mm."""
    beam = replace(outline((7600.0, 9200.0)), b_w=b_w)
    zones = tuple(StirrupZone(k, 0.0, 0.0, 1, 250.0, "10M") for k in (1, 2))
    steel = steel_at(beam, Detailing(runs, zones), x, 20.0)
    found: dict[int, list[float]] = {}
    for run, circle in web_circles(steel):
        found.setdefault(runs.index(run), []).append(round(circle.centre[0], 1))
    return {index: sorted(xs) for index, xs in found.items()}


def test_corner_bars_stay_in_the_corners() -> None:
    """The string that reaches furthest stands outside at every section.

    Corner bars: 30 + 11.3 + 22.5 = 63.8 mm from the side, as their place in the bend is. Inner
    ones at thirds: 63.8 + (380 - 127.6)/3 = 147.9 mm.
    """
    assert laid_at(1000.0) == {1: [63.8, 316.2]}
    assert laid_at(7600.0) == {0: [147.9, 232.1], 2: [63.8, 316.2]}
    assert laid_at(11000.0) == {2: [63.8, 316.2]}


def test_lapped_bars_are_drawn_in_contact() -> None:
    """63.8 + 19.5 = 83.3 mm: the bar that goes on touches the one that ends, inside it."""
    assert laid_at(3800.0) == {1: [63.8, 316.2], 2: [83.3, 296.7]}


def test_lapped_bars_without_room_lie_one_above_the_other() -> None:
    """Width 200: 136.2 - 63.8 = 72.4 between the corners, less 3 x 19.5 = 13.9 < 30 mm clear."""
    assert laid_at(3800.0, b_w=200.0) == {1: [63.8, 136.2], 2: [63.8, 136.2]}


def test_an_odd_bar_stands_in_the_middle() -> None:
    """Three that run through and two between: the third in the middle, the others in pairs."""
    runs = (
        BarRun("bottom", 1, 2, "20M", 1000.0, 5000.0),
        BarRun("bottom", 1, 3, "20M", 0.0, 7600.0),
    )
    assert laid_at(3000.0, runs) == {0: [126.9, 253.1], 1: [63.8, 190.0, 316.2]}


def test_stirrup_keeps_the_cover() -> None:
    """Its outer edges lie 30 mm inside the concrete; inner stirrups within the outer one."""
    for closed in (False, True):
        figure = section_at(BEAM, marked(BEAM, legs=4, closed=closed), 3800.0)
        drawn, _ = lower(figure)
        x0, y0 = figure.origin
        points = [
            ((x - x0) / figure.scale, (y - y0) / figure.scale)
            for shape in drawn
            if isinstance(shape, Line) and shape.layer == "stirrups"
            for x, y in (shape.start, shape.end)
        ]
        assert min(x for x, _ in points) == pytest.approx(30.0)
        assert max(x for x, _ in points) == pytest.approx(350.0)
        assert min(y for _, y in points) == pytest.approx(30.0)
        assert max(y for _, y in points) == pytest.approx(590.0)


def test_sections_of_a_beam() -> None:
    """Faces of supports and midspans; alike sections once, letters in order, I left out."""
    found = sections_of(BEAM, marked(BEAM))
    many = sections_of(outline((7600.0, 9200.0) * 5), marked(outline((7600.0, 9200.0) * 5)))

    assert [letter for letter, _, _ in found] == list("ABCD")
    assert [x for _, x, _ in found] == [225.0, 3800.0, 7375.0, 12200.0]
    assert "I" not in [letter for letter, _, _ in many]
    cantilever = outline((2500.0, 8000.0), left=FREE_END, right=COLUMN)
    assert sections_of(cantilever, marked(cantilever))[0][1] == 2275.0


def test_ties_within_the_support_are_not_the_stirrups_of_its_face() -> None:
    """At the face the ties are 30 mm away and the first stirrup 75: the section has the stirrup."""
    zones = (
        StirrupZone(1, 300.0, 7000.0, 21, 335.0, "10M"),
        StirrupZone(1, 60.0, 195.0, 4, 45.0, "10M", around_hooks=True),
    )
    steel = steel_at(BEAM, Detailing(STRING, zones), 225.0, 20.0)
    assert steel.zone is zones[0]


def test_bars_of_two_runs_in_the_overhangs_stand_beside_each_other() -> None:
    """Two of each run, one at each side: four circles apart, named in one line.

    Of two runs that are lapped the bars touch: (16 + 16)/2 = 16 mm from centre to centre.
    """
    first = BarRun("top", 1, 2, "15M", 0.0, 5000.0, "overhang", mark="T01")
    more = BarRun("top", 1, 2, "15M", 1000.0, 9000.0, "overhang", mark="T02")
    figure = section_at(BEAM, Detailing((first, more), ()), 3000.0)
    places = sorted(circle.centre[0] for circle in circles_of(figure))
    assert len(places) == 4
    assert min(b - a for a, b in pairwise(places)) > 100.0
    assert "T01 2-15M, T02 2-15M in flange" in words_of(figure)

    on = replace(more, start=4200.0, end=9000.0)
    lapped = section_at(BEAM, Detailing((first, on), ()), 4600.0)
    places = sorted(circle.centre[0] for circle in circles_of(lapped))
    assert (places[1] - places[0], places[3] - places[2]) == pytest.approx((16.0, 16.0))


@pytest.mark.parametrize("face", ["bottom", "top"])
@pytest.mark.parametrize("corner_first", [True, False])
def test_arrows_of_names_do_not_cross(face: Face, corner_first: bool) -> None:  # noqa: FBT001
    """Bars in the corners and between them, in either order of the list."""
    runs = (BarRun(face, 1, 2, "20M", 0.0, 7600.0), BarRun(face, 1, 2, "20M", 1000.0, 5000.0))
    figure = section_at(BEAM, Detailing(runs if corner_first else runs[::-1], ()), 3000.0)
    arrows = [LineString([s.start, s.end]) for s in figure.shapes if isinstance(s, Arrow)]
    assert not any(one.crosses(two) for one, two in combinations(arrows, 2))


def test_section_says_what_it_shows() -> None:
    """Marks, numbers and sizes as names and in the alternative text."""
    figure = section_at(BEAM, marked(BEAM), 7375.0, letter="C", tension="top")

    assert {"T02 3-25M", "T04 2-25M", "T03 4-15M in flange", "B01 3-25M", "S01 10M @ 125"} <= set(
        words_of(figure)
    )
    assert figure.caption == "Section C"
    assert "T03 4-15M layer 1 (overhang)" in figure.alt
    assert "open stirrups 10M at 125 mm, 2 legs" in figure.alt


def test_slab_goes_on_beyond_its_effective_width() -> None:
    """An L section of 300 by 600 and a flange of 900 drawn whole: a break line ends the slab.

    No closed outline, and at the outer edge no straight line from soffit to top.
    """
    beam = replace(outline((7600.0,), shape="L"), b_w=300.0, widths=(900.0,), depths=(600.0,))
    figure = section_at(beam, Detailing((), ()), 3800.0)
    concrete = [s for s in figure.shapes if isinstance(s, Polyline) and s.layer == "concrete"]
    (edge,) = [s for s in concrete if all(abs(x - 900.0) < 50.0 for x, _ in s.points)]

    assert "flange shortened" not in " ".join(words_of(figure))
    assert not any(s.closed for s in concrete)
    assert len({x for x, _ in edge.points}) == 3  # the jog to both sides
    assert min(y for _, y in edge.points) < 600.0 - beam.h_f
    assert max(y for _, y in edge.points) > 600.0


def test_section_without_steel() -> None:
    """A station without bars and stirrups is drawn as plain concrete, without d."""
    figure = section_at(BEAM, Detailing((), ()), 3800.0)

    assert_readable(figure, SOLID)
    assert circles_of(figure) == []
    assert not any(text.startswith("d =") for text in words_of(figure))
    assert "bottom bars none" in figure.alt


def items(beam: BeamOutline, *more: BarRun, **changes: Any) -> tuple[BarItem, ...]:
    """Return the lines of the schedule."""
    given = detailing(beam, **changes)
    return schedule(beam, Detailing((*given.bars, *more), given.stirrups)).items


HOOKED = (
    BarRun("bottom", 1, 2, "15M", 0.0, 2000.0, hook_end="180"),
    BarRun("bottom", 1, 2, "15M", 0.0, 2000.0, hook_start="180", hook_end="180"),
    BarRun("bottom", 1, 2, "15M", 0.0, 3000.0, hook_start="90", hook_end="180"),
    BarRun("top", 1, 2, "35M", 0.0, 23000.0, hook_start="90", hook_end="90"),
)


@pytest.mark.parametrize(("legs", "closed"), [*product((2, 3, 5), (False, True))])
def test_bending_shapes_are_readable(legs: int, closed: bool) -> None:  # noqa: FBT001
    """All kinds of hooks and stirrups; one cell a mark with all its legs."""
    lines = items(BEAM, *HOOKED, legs=legs, closed=closed)
    (figure,) = bends_figures(lines)
    said = words_of(figure)

    assert_readable(figure, SOLID)
    for item in lines:
        assert any(text.startswith(f"{item.mark} {item.number}-{item.size}") for text in said)
        for letter, length in item.shape.legs:
            assert f"{letter} {length:.0f}" in said
        assert f"{item.mark} {item.number}-{item.size}" in figure.alt
    assert len(said) == 1 + len(lines) + sum(len(item.shape.legs) for item in lines)


def test_long_schedules_take_several_figures() -> None:
    """150 marks over pages of at most 220 mm, none lost."""
    lines = [
        BarItem(f"B{n:02d}", "20M", 2, bent_bar("20M", 3000.0 + 10 * n, "90")) for n in range(150)
    ]
    figures = bends_figures(lines)

    assert all(figure.height <= 220.0 for figure in figures)
    names = [text for figure in figures for text in words_of(figure) if text.startswith("B")]
    assert sum(name.split()[0][1:].isdigit() and "cut" in name for name in names) == 150
    assert COLUMNS == 3


@pytest.mark.parametrize(
    "shape", [item.shape for item in items(BEAM, *HOOKED, legs=5, closed=True)], ids=str
)
def test_drawn_chain_is_as_long_as_the_bar(shape: BentShape) -> None:
    """Lines and arcs of the true chain add up to the centre line; each starts where one ends."""
    middle = shape.radius + shape.diameter / 2
    drawn = chain((0.0, 0.0), 0.0, shape.straights, shape.bends, middle, "bars", 0.5)
    lengths = [Point(s.start).distance(Point(s.end)) for s in drawn.shapes if isinstance(s, Line)]
    arcs = [
        (s.end_angle - s.start_angle) / 360.0 * 2 * 3.141592653589793 * s.radius
        for s in drawn.shapes
        if isinstance(s, Arc)
    ]

    assert sum(lengths) + sum(arcs) == pytest.approx(shape.centre_line)
    for bend, straight in zip(drawn.bends, [s for s in drawn.shapes if isinstance(s, Line)][1:],
                              strict=True):  # fmt: skip
        assert bend.end == pytest.approx(straight.start)


def test_scale_of_the_section() -> None:
    """At 1 : 15 a depth of 620 mm is 41.33 mm on paper, a width of 380 mm 25.33 mm."""
    beam = outline(shape="rectangular")
    figure = section_at(beam, marked(beam), 3800.0)
    drawn, _ = lower(figure)
    (web,) = [s for s in drawn if isinstance(s, Polyline) and s.layer == "concrete"]
    xs, ys = zip(*web.points, strict=True)

    assert max(ys) - min(ys) == pytest.approx(41.33, abs=0.005)
    assert max(xs) - min(xs) == pytest.approx(25.33, abs=0.005)
    assert any("Scale 1 : 15" in text for text in words_of(figure))
