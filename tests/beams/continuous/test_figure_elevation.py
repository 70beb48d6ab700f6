"""Elevation: true to scale, complete, legible for any number of spans."""

from __future__ import annotations

from collections import Counter
from itertools import pairwise, product

import pytest

from lineproof.beams.continuous.figure_elevation import elevation_figure, elevation_figures
from lineproof.beams.continuous.figure_elevation_gaps import Short
from lineproof.beams.continuous.figure_elevation_view import parts
from lineproof.beams.continuous.layout import BarRun, BeamOutline, Detailing, StirrupZone
from lineproof.beams.continuous.schedule import schedule
from lineproof.drawing import OUTLINE, Arc, Circle, Dimension, Figure, Line, Text

from .by_hand import COLUMN, FREE_END, GIRDER, detailing, outline, random_beam
from .print_checks import assert_readable, plain, words_of

SOLID = frozenset({"concrete", "bars", "stirrups", "dimensions"})
LENGTHS = (7600.0, 9200.0, 7600.0, 7000.0, 6000.0, 8400.0)
BEAM = outline()


def marked(beam: BeamOutline, **changes: bool) -> Detailing:
    """Return the bars of a beam with their marks."""
    return schedule(beam, detailing(beam, **changes)).detailing


def elevation(beam: BeamOutline = BEAM) -> Figure:
    """Return the whole elevation."""
    return elevation_figure(beam, marked(beam), sections=(("A", 3800.0), ("B", 8000.0)))


def bars_apart(figure: Figure) -> list[Line]:
    """Return the lines of bars drawn apart, hooks left out."""
    return [
        s
        for s in figure.shapes
        if isinstance(s, Line)
        and s.layer == "bars"
        and s.weight == OUTLINE
        and s.start[1] == s.end[1]
    ]


@pytest.mark.parametrize("count", range(1, 7))
def test_elevation_is_readable(count: int) -> None:
    """One span to six on one drawing, and in rows: no text touches a text or a line."""
    beam = outline(LENGTHS[:count])
    assert_readable(elevation(beam), SOLID)
    for figure in elevation_figures(beam, marked(beam), sections=(("A", 3800.0),)):
        assert_readable(figure, SOLID)


@pytest.mark.parametrize(
    ("left", "right", "depths"),
    [
        *product(
            (GIRDER, COLUMN, FREE_END), (COLUMN, FREE_END), ((450.0,) * 3, (620.0, 1400.0, 700.0))
        )
    ],
)
def test_other_ends_and_depths(left: object, right: object, depths: tuple[float, ...]) -> None:
    """Girders, columns and free ends; shallow beams and steps of depth."""
    beam = outline((2800.0, 8000.0, 2400.0), left=left, right=right, depths=depths)  # type: ignore[arg-type]
    for coated in (False, True):
        figure = elevation_figure(beam, marked(beam, closed=True), coated=coated)
        assert_readable(figure, SOLID)


@pytest.mark.parametrize("lengths", [(800.0, 900.0), (30000.0,) * 2, (3000.0,) * 6])
def test_short_and_long_spans(lengths: tuple[float, ...]) -> None:
    """Spans of 800 mm to 30 m."""
    beam = outline(lengths)
    for figure in elevation_figures(beam, marked(beam)):
        assert_readable(figure, SOLID)


@pytest.mark.parametrize("seed", range(24))
def test_any_beam_is_readable(seed: int) -> None:
    """Supports without width, walls, free ends, bars and hooks anywhere, up to six spans."""
    beam, given = random_beam(seed, 6)
    made = schedule(beam, given).detailing
    for figure in elevation_figures(beam, made):
        assert_readable(figure, SOLID)


def test_every_run_is_drawn_once_at_its_place() -> None:
    """Each bar is a line from its start to its end, with mark, number and size over it."""
    given = marked(BEAM)
    figure = elevation()
    drawn = sorted((s.start[0], s.end[0]) for s in bars_apart(figure))

    assert drawn == sorted((run.start, run.end) for run in given.bars)
    labels = Counter(" ".join(text.split()[:2]) for text in words_of(figure) if " × " in text)
    assert labels == Counter(f"{run.mark} {run.number}-{run.size}" for run in given.bars)


def test_bars_of_a_row_do_not_overlap() -> None:
    """Two runs at one height lie beside each other."""
    rows: dict[float, list[tuple[float, float]]] = {}
    for line in bars_apart(elevation(outline(LENGTHS))):
        rows.setdefault(round(line.start[1], 3), []).append((line.start[0], line.end[0]))
    for row in rows.values():
        row.sort()
        assert all(one[1] < two[0] for one, two in pairwise(row))


def test_every_stirrup_is_drawn() -> None:
    """As many as the zones say, first and last where the zone begins and ends."""
    given = marked(BEAM)
    places = [s.start[0] for s in elevation().shapes if isinstance(s, Line) and
              s.layer == "stirrups"]  # fmt: skip

    assert len(places) == sum(zone.number for zone in given.stirrups)
    for zone in given.stirrups:
        within = [x for x in places if zone.start - 0.5 <= x <= zone.end + 0.5]
        assert len(within) == zone.number
        assert (min(within), max(within)) == pytest.approx((zone.start, zone.end))


def test_zones_are_named() -> None:
    """Number, size, spacing; mark and length: 12-10M @ 125 over 11 x 125 = 1375 mm."""
    said = words_of(elevation())

    assert said.count("12-10M @ 125") == 4
    assert said.count("S01 1375") == 4
    assert said.count("21-10M @ 250") == 1


def test_cut_off_lengths() -> None:
    """Measured by the dimension itself: from the axis at 7600 mm to 0.3 x 7600 = 2280 mm off."""
    sizes = Counter(
        (round(s.start[0]), round(s.measured)) for s in elevation().shapes
        if isinstance(s, Dimension) and s.size == 2.3 and not s.symbol
    )  # fmt: skip

    assert sizes[7600, 2280] == 4  # two layers at each side, T02 and the bars in the flange
    assert sizes[7600, 1368] == 2
    assert sizes[0, 175] == 2  # bottom bars and hooked top bars reach 225 - 50 mm past the axis
    assert sizes[7600, 300] == 2
    assert sizes[7600, 900] == 2


def test_both_lengths_of_a_short_bar_at_an_end_are_given() -> None:
    """2.00 m into the span and 150 mm past the axis: the shorter stands under the longer."""
    beam = outline((7600.0, 9200.0, 7600.0), left=GIRDER)
    bars = Detailing((BarRun("top", 1, 2, "20M", -150.0, 2000.0, "overhang", "90"),), ())
    figure = elevation_figure(beam, schedule(beam, bars).detailing)
    cuts = {
        round(s.measured): s.offset for s in figure.shapes
        if isinstance(s, Dimension) and s.size == 2.3 and not s.symbol
    }  # fmt: skip

    assert set(cuts) == {150, 2000}
    assert cuts[150] < cuts[2000] - 2.3  # lower by more than the height of the text
    assert_readable(figure, SOLID)


def test_names_of_stirrups_stand_clear_of_the_axes() -> None:
    """The upright names and their axes: at least half the text of 2.3 mm apart."""
    for lengths in (LENGTHS[:3], LENGTHS, (3000.0,) * 6):
        beam = outline(lengths)
        figure = elevation_figure(beam, marked(beam))
        axes = [x * figure.scale for x in beam.axes]
        names = [s.at[0] * figure.scale for s in figure.shapes
                 if isinstance(s, Text) and s.rotation == 90.0]  # fmt: skip
        assert all(abs(x - axis) > 1.15 for x in names for axis in axes)


def test_letters_stand_clear_of_the_axes() -> None:
    """A cut at the left face of a support: its letter goes to the left of the arrow."""
    figure = elevation_figure(BEAM, marked(BEAM), sections=(("C", 7375.0), ("D", 7825.0)))
    at = {plain(s): s for s in figure.shapes if isinstance(s, Text) and plain(s) in {"C", "D"}}

    assert (at["C"].anchor, at["D"].anchor) == ("end", "start")
    assert at["C"].at[0] < 7375.0
    assert at["D"].at[0] > 7825.0


def test_places_of_short_hatching_stand_in_the_note() -> None:
    """0.30 m is 2 mm on paper, too short for its place; 3.00 m has room for it."""
    short = (Short("top", 1, 7075.0, 7375.0, "7.08 to 7.38"), Short("top", 2, 9600.0, 12600.0,
             "2.00 to 5.00"))  # fmt: skip
    figure = elevation_figure(BEAM, marked(BEAM), short=short)
    (note,) = [text for text in words_of(figure) if "7.08" in text]

    assert note.endswith("top of span 1, 7.08 to 7.38.")
    assert "2.00 to 5.00" in words_of(figure)
    assert_readable(figure)


def test_supports_are_named_in_words() -> None:
    """Bubbles are the names of grid lines; supports that stand too close have numbers alone."""
    assert {f"support {number}" for number in range(1, 5)} <= set(words_of(elevation()))
    assert not any(isinstance(s, Circle) for s in elevation().shapes)
    close = words_of(elevation_figure(beam := outline((800.0, 30000.0)), marked(beam)))
    assert {"1", "2", "3"} <= set(close)


def test_spans_are_dimensioned() -> None:
    """Axis to axis and face to face; no dimension is typed, all are measured."""
    figure = elevation()
    said = words_of(figure)

    assert [text for text in said if text in {"7600", "9200"}] == ["7600", "9200", "7600"]
    assert said.count("clear 7150") == 2
    assert said.count("clear 8750") == 1
    assert all(not s.value for s in figure.shapes if isinstance(s, Dimension))


def test_concrete_is_to_scale() -> None:
    """24 850 mm at 1 : 150; the soffits lie 620 mm below the top, as long as the clear lengths."""
    figure = elevation()
    soffits = [
        s for s in figure.shapes
        if isinstance(s, Line) and s.layer == "concrete" and s.start[1] == s.end[1] == -620.0
    ]  # fmt: skip

    assert figure.scale == pytest.approx(1 / 150)
    assert [s.end[0] - s.start[0] for s in soffits] == [7150.0, 8750.0, 7150.0]


def test_sections_are_marked() -> None:
    """A letter beside each cut, and none for a station of other spans."""
    letters = [
        plain(s) for s in elevation().shapes if isinstance(s, Text) and plain(s) in {"A", "B"}
    ]
    rows = elevation_figures(
        outline(LENGTHS), marked(outline(LENGTHS)), sections=(("A", 3800.0), ("B", 40000.0))
    )

    assert letters == ["A", "B"]
    assert ["A" in words_of(figure) for figure in rows] == [True, False]
    assert ["B" in words_of(figure) for figure in rows] == [False, True]


def test_rows_of_spans() -> None:
    """Six spans in two rows, four in two, three of 15 m in two; every span once."""
    assert parts(outline(LENGTHS)) == ((1, 3), (4, 6))
    assert parts(outline(LENGTHS[:4])) == ((1, 2), (3, 4))
    assert parts(outline((15000.0,) * 3)) == ((1, 2), (3, 3))
    for count in range(1, 25):
        shown = [n for a, b in parts(outline((7000.0,) * count)) for n in range(a, b + 1)]
        assert shown == list(range(1, count + 1))


def test_rows_show_all_bars() -> None:
    """Over all rows every mark appears, and the bars over the support between two rows in both."""
    beam = outline(LENGTHS)
    given = marked(beam)
    rows = [
        {text.split()[0] for text in words_of(figure) if " × " in text}
        for figure in elevation_figures(beam, given)
    ]
    over = {run.mark for run in given.bars if run.face == "top" and
            run.start < beam.axes[3] < run.end}  # fmt: skip

    assert set().union(*rows) == {run.mark for run in given.bars}
    assert over
    assert over <= rows[0] & rows[1]


def test_hooks_point_into_the_beam() -> None:
    """Hooks of top bars point down, of bottom bars up, 180 degree hooks are round."""
    given = Detailing(
        (
            BarRun("top", 1, 3, "20M", -175.0, 3000.0, hook_start="90", mark="T01"),
            BarRun("bottom", 1, 3, "20M", -175.0, 5000.0, hook_start="90", mark="B01"),
            BarRun("bottom", 1, 2, "20M", 18000.0, 24575.0, hook_end="180", mark="B02"),
        ),
        (StirrupZone(2, 8000.0, 8000.0, 1, 0.0, "10M", mark="S01"),),
    )
    figure = elevation_figure(BEAM, given)
    hooks = [s for s in figure.shapes if isinstance(s, Line) and s.layer == "bars"
             and s.start[0] == s.end[0]]  # fmt: skip

    assert_readable(figure, SOLID)
    assert [s.end[1] < s.start[1] for s in hooks] == [True, False]
    (bend,) = [s for s in figure.shapes if isinstance(s, Arc)]
    assert bend.centre[0] + bend.radius == pytest.approx(24575.0)
    assert any(
        s.layer == "bars" and s.end == pytest.approx((bend.centre[0], bend.centre[1] - bend.radius))
        for s in figure.shapes if isinstance(s, Line)
    )  # fmt: skip
    assert "1-10M" in words_of(figure)


def test_a_lone_stirrup_has_one_stroke_and_no_length() -> None:
    """A line without length and a name that ends in a space stood in the drawing."""
    zone = StirrupZone(2, 8000.0, 8000.0, 1, 0.0, "10M", mark="S01")
    bar = BarRun("bottom", 1, 3, "20M", 0.0, 5000.0, mark="B01")
    figure = elevation_figure(BEAM, Detailing((bar,), (zone,)))
    lines = [s for s in figure.shapes if isinstance(s, Line)]

    assert "S01" in words_of(figure)
    assert all(line.start != line.end for line in lines)


@pytest.mark.parametrize("count", [1, 3])
def test_ties_within_the_end_supports(count: int) -> None:
    """Ties around hooks stand within the support; their name keeps clear of the others."""
    beam = outline(LENGTHS[:count])
    given = detailing(beam)
    end = beam.ends[1]
    ties = (
        StirrupZone(1, -175.0, -25.0, 3, 75.0, "10M", around_hooks=True),
        StirrupZone(count, end - 200.0, end - 50.0, 3, 75.0, "10M", around_hooks=True),
    )
    made = schedule(beam, Detailing(given.bars, (*given.stirrups, *ties)))
    figure = elevation_figure(beam, made.detailing)

    assert_readable(figure, SOLID)
    names = [text for text in words_of(figure) if "3-10M @ 75" in text]
    assert len(names) == 2
    assert sum("ties" in text for text in words_of(figure)) == 2
    assert any("Ties stand around hooks; hanger stirrups are not" in t for t in words_of(figure))
    assert (made.sets[0].first, made.sets[0].last) == (-400.0, -250.0)


def test_names_of_ties_stand_beside_the_axes() -> None:
    """At 1 : 150 the ties' middle is 100/150 = 0.7 mm from the axis; half a name is 1.15 mm high.

    So the name moves outward, clear of the axis.
    """
    beam = outline(LENGTHS)
    end = beam.axes[-1]
    ties = (
        StirrupZone(1, -175.0, -25.0, 3, 75.0, "10M", around_hooks=True),
        StirrupZone(len(LENGTHS), end + 25.0, end + 175.0, 3, 75.0, "10M", around_hooks=True),
    )
    given = detailing(beam)
    made = schedule(beam, Detailing(given.bars, (*given.stirrups, *ties)))
    figure = elevation_figure(beam, made.detailing)
    names = [
        shape for shape in figure.shapes
        if isinstance(shape, Text) and shape.rotation and "3-10M @ 75" in plain(shape)
    ]  # fmt: skip
    outward = [max(-name.at[0], name.at[0] - end) for name in names]
    assert len(outward) == 2
    assert min(outward) * figure.scale > 1.15 + 0.35 - 1e-6  # half the line of the axis, round-off


def test_words_say_what_is_drawn() -> None:
    """The alternative text gives spans, bars with places and zones."""
    alt = elevation().alt

    assert "span 2 of 9200 mm, 620 mm deep" in alt
    assert "T01 3-20M from −175 to 1525" in alt
    assert "span 1 12-10M at 125" in alt
