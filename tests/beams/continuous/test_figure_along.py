"""Envelopes, deflected shapes and loads along a beam: values, sides, legibility."""

from __future__ import annotations

from dataclasses import replace

import pytest

from lineproof.beams.analysis.model import (
    FIXED,
    FREE,
    Load,
    PartialLoad,
    PointLoad,
    Support,
    UniformLoad,
)
from lineproof.beams.continuous.deflection_figure import CHECKED, MIDSPAN, TIP
from lineproof.beams.continuous.figure_along import in_figures
from lineproof.beams.continuous.figure_deflection import (
    DeflectionCurve,
    DeflectionPiece,
    deflection_figure,
)
from lineproof.beams.continuous.figure_envelope import (
    RESTRAINED,
    MomentPiece,
    Section,
    ShearPiece,
    moment_figure,
    shear_figure,
)
from lineproof.beams.continuous.figure_loads import loads_figure
from lineproof.beams.continuous.figure_rows import in_rows, side_by_side
from lineproof.beams.continuous.layout import BuiltSupport
from lineproof.drawing import Arrow, Circle, Figure, Line, Polyline, Text

from .by_hand import COLUMN, FREE_END, GIRDER, outline
from .made_envelopes import deflections, moment_sections, moments, shear_sections, shears
from .print_checks import assert_readable, plain, words_of

LENGTHS = (7600.0, 9200.0, 7600.0, 7000.0, 6000.0, 8400.0)
DIMENSIONS = frozenset({"dimensions"})
ONE = outline((8000.0,), left=BuiltSupport(400.0, "simple", "wall"), right=COLUMN)
SIMPLE = Support("simple")
ELASTIC = Support("elastic", 450.0, 1e11)


def curves_of(figure: Figure) -> list[Polyline]:
    """Return the curves of a figure."""
    return [s for s in figure.shapes if isinstance(s, Polyline) and s.layer == "curve"]


def height_of(figure: Figure, tick: str) -> float:
    """Return where on paper a tick of the values stands."""
    (found,) = [
        s.at[1] for s in figure.shapes
        if isinstance(s, Text) and s.layer == "axes" and s.anchor == "end" and plain(s) == tick
    ]  # fmt: skip
    return found


@pytest.mark.parametrize("count", range(1, 7))
def test_curves_are_readable(count: int) -> None:
    """One span to six: no text touches another or a leader."""
    beam = outline(LENGTHS[:count])
    names = ("immediate, live load", "after attachment, sustained", "total")
    for figure in (
        moment_figure(beam, moments(beam), moment_sections(beam)),
        shear_figure(beam, shears(beam), shear_sections(beam)),
        deflection_figure(beam, deflections(beam, names)),
    ):
        assert_readable(figure, DIMENSIONS)


@pytest.mark.parametrize("lengths", [(2500.0, 8000.0, 2000.0), (1200.0, 14000.0, 900.0)])
def test_cantilevers_are_readable(lengths: tuple[float, ...]) -> None:
    """Short cantilevers beside long spans."""
    beam = outline(lengths, left=FREE_END, right=FREE_END)
    for figure in (
        moment_figure(beam, moments(beam), moment_sections(beam)),
        shear_figure(beam, shears(beam), shear_sections(beam)),
        deflection_figure(beam, deflections(beam, ("immediate", "total"))),
    ):
        assert_readable(figure, DIMENSIONS)


def test_a_note_longer_than_the_page_takes_two_lines() -> None:
    """With a span and a cantilever that are checked the note was cut off at the edge."""
    beam = outline((6000.0, 3400.0), left=GIRDER, right=FREE_END)
    note = CHECKED.format(f"{MIDSPAN} and {TIP}")
    figure = deflection_figure(beam, deflections(beam, ("immediate", "total")), notes=(note,))
    assert_readable(figure, DIMENSIONS)
    said = words_of(figure)
    assert note not in said
    assert note in " ".join(said)


def test_long_beams_take_several_figures() -> None:
    """24 spans in four figures of six, each readable, none lost."""
    beam = outline(LENGTHS * 4)
    groups = in_figures(moments(beam))

    assert [piece.span for group in groups for piece in group] == list(range(1, 25))
    for group in groups:
        assert len(group) == 6
        assert_readable(moment_figure(beam, group, moment_sections(beam)), DIMENSIONS)


def one_span(M_r: float = 500e6) -> MomentPiece:
    """Return moments of 400 kN.m at midspan and -100 kN.m at the right face."""
    return MomentPiece(
        1, (200.0, 4000.0, 7775.0), (0.0, 400e6, 0.0), (0.0, 100e6, -100e6),
        (M_r,) * 3, (120e6,) * 3,
    )  # fmt: skip


def test_moment_is_drawn_on_the_side_in_tension() -> None:
    """400 kN.m lies below the axis at the height of its tick, and the figure says so."""
    figure = moment_figure(ONE, [one_span()])
    largest = curves_of(figure)[0]

    assert largest.points[1][1] == pytest.approx(height_of(figure, "400"))
    assert height_of(figure, "400") < height_of(figure, "0") < height_of(figure, "−200")
    assert any("side in tension" in text for text in words_of(figure))


BENT = (Section(4000.0, 400e6, 500e6), Section(7775.0, -100e6, 120e6))


def test_sections_have_their_values() -> None:
    """The section of the span and that of the face, each with its own resistance."""
    figure = moment_figure(ONE, [one_span()], BENT)
    said = words_of(figure)

    assert [text for text in said if text.startswith("M") and "=" in text] == [
        "Mr = −120", "Mf = −100", "Mf = 400", "Mr = 500",
    ]  # fmt: skip
    assert "at 4000 mm Mf = 400, Mr = 500 kN·m" in figure.alt
    assert "at 7775 mm Mf = −100, Mr = −120 kN·m" in figure.alt
    dots = [s.centre for s in figure.shapes if isinstance(s, Circle) and s.layer == "curve"]
    drawn = curves_of(figure)[0].points[1]
    assert any(dot == pytest.approx(drawn, abs=1e-4) for dot in dots)  # the curve's decimals


def test_values_are_those_of_the_section_to_the_digits_of_the_table() -> None:
    """271.44 kN prints 271 although the envelope beside it has 320; 96.35 prints 96.4 as there."""
    sections = (Section(1000.0, 96.35e3, 271.44e3),)
    said = words_of(shear_figure(ONE, [shear_piece()], sections))

    assert [text for text in said if "=" in text] == ["Vr = 271", "Vf = 96.4"]


def test_each_case_of_a_place_is_said_once() -> None:
    """Two cases at one place both stand there; a third with the same numbers adds nothing.

    At 7000 mm the envelope has 300 x 3000/4000 = 225 kN, so a dot at 114 lies inside.
    """
    sections = [Section(7000.0, -225e3, 271e3), Section(7000.0, -114e3, 325e3)]
    figure = shear_figure(ONE, [shear_piece()], [*sections, sections[0]])
    said = words_of(figure)

    assert sorted(text for text in said if "=" in text) == [
        "Vf = −114", "Vf = −225", "Vr = −271", "Vr = −325",
    ]  # fmt: skip
    assert any("dot inside the curves" in text for text in said)
    alone = words_of(shear_figure(ONE, [shear_piece()], sections[:1]))
    assert not any("dot inside the curves" in text for text in alone)


def test_moment_of_restraint_is_named() -> None:
    """A moment that no load case has stands off the curves and says what it is."""
    held = Section(200.0, -115e6, 219e6, RESTRAINED)
    figure = moment_figure(ONE, [one_span()], [*BENT, held])

    assert "at 200 mm Mf = −115, Mr = −219, restraint kN·m" in figure.alt
    assert any(text.startswith("Restraint: assumed") for text in words_of(figure))
    assert not any("estraint" in text for text in words_of(moment_figure(ONE, [one_span()], BENT)))


def test_section_without_resistance_says_so() -> None:
    figure = shear_figure(ONE, [shear_piece()], [Section(1000.0, 225e3, None)])
    assert {"Vf = 225", "no Vr"} <= set(words_of(figure))


def test_moment_over_the_resistance_is_marked() -> None:
    """390 < 400 kN.m at midspan is drawn and said; 400 is enough."""
    over = moment_figure(ONE, [one_span(390e6)])
    held = moment_figure(ONE, [one_span(400e6)])

    assert any("EXCEEDED" in text for text in words_of(over))
    assert "Resistance exceeded from 200 to 7775 mm." in over.alt
    assert not any("EXCEEDED" in text for text in words_of(held))
    assert sum(isinstance(s, Line) and s.weight > 1.0 for s in over.shapes) == 1
    assert sum(isinstance(s, Line) and s.weight > 1.0 for s in held.shapes) == 0


def test_negative_moment_over_the_resistance_is_marked() -> None:
    """Only the end of the span: 100 against 90 kN.m at the right face."""
    piece = MomentPiece(
        1, (200.0, 4000.0, 7000.0, 7775.0), (0.0, 400e6, 0.0, 0.0), (0.0, 0.0, 0.0, -100e6),
        (500e6,) * 4, (90e6,) * 4,
    )  # fmt: skip
    assert "exceeded from 7000 to 7775 mm" in moment_figure(ONE, [piece]).alt


def shear_piece() -> ShearPiece:
    """Return shears from 300 to -300 kN in a straight line, V_r 320 near the ends, 160 between."""
    xs = (200.0, 2000.0, 2000.0, 6000.0, 6000.0, 7775.0)
    V = tuple(300e3 * (4000.0 - x) / 4000.0 for x in xs)
    V_r = (320e3, 320e3, 160e3, 160e3, 320e3, 320e3)
    return ShearPiece(1, xs, V, V, V_r)


def test_shear_values_at_critical_sections() -> None:
    """At 1000 mm: 300 x 3000/4000 = 225 kN; at 7000 mm as much upward."""
    sections = (Section(1000.0, 225e3, 320e3), Section(7000.0, -225e3, 320e3))
    critical = (1000.0, 7000.0)
    figure = shear_figure(ONE, [shear_piece()], sections, critical)
    said = words_of(figure)

    assert {"Vf = 225", "Vr = 320", "Vf = −225", "Vr = −320"} <= set(said)
    assert not any("EXCEEDED" in text for text in said)
    low = ShearPiece(1, shear_piece().x, shear_piece().V_max, shear_piece().V_min, [140e3] * 6)
    assert "exceeded" in shear_figure(ONE, [low], critical=critical).alt


def test_positive_shear_is_drawn_upward() -> None:
    figure = shear_figure(ONE, [shear_piece()])
    assert height_of(figure, "200") > height_of(figure, "0")
    assert curves_of(figure)[0].points[0][1] > height_of(figure, "200")


def test_faces_are_marked() -> None:
    """A dotted line at each face of three supports within the drawing, a chain at each axis."""
    beam = outline(LENGTHS[:2])
    figure = moment_figure(beam, moments(beam))
    lines = [s for s in figure.shapes if isinstance(s, Line) and s.layer == "centre"]

    assert sum(s.dash == "dotted" for s in lines) == 6
    assert sum(s.dash == "chain" for s in lines) == 3
    told = "axes of the supports, chained; their faces and the values marked, dotted"
    assert f"Thin lines: {told}." in words_of(figure)


def test_deflections() -> None:
    """Downward is down; the largest of each span and curve is printed; uplift has its sign."""
    beam = outline((6000.0, 4000.0), left=GIRDER, right=FREE_END)
    curves = [
        DeflectionCurve(name, [
            DeflectionPiece(1, (0.0, 3000.0, 6000.0), (0.0, size, 0.0)),
            DeflectionPiece(2, (6000.0, 10000.0), (0.0, -size / 2)),
        ])
        for name, size in (("immediate", 4.2), ("total", 9.6))
    ]  # fmt: skip
    figure = deflection_figure(beam, curves, notes=("Not those of the checks.",))
    said = words_of(figure)

    assert {"(a) 4.2", "(b) 9.6", "(a) −2.1", "(b) −4.8"} <= set(said)
    assert {"(a) immediate", "(b) total"} <= set(said)
    first = curves_of(figure)[0].points
    assert first[1][1] < first[0][1]
    assert "Not those of the checks." in said
    assert not any("coincides" in each for each in said)
    twice = words_of(deflection_figure(beam, [curves[0], replace(curves[0], name="again")]))
    assert any("(b) coincides with (a)." in each for each in twice)
    with pytest.raises(ValueError, match="5 deflected shapes"):
        deflection_figure(beam, curves[:1] * 5)


def all_loads(lengths: tuple[float, ...]) -> list[Load]:
    """Return loads of three types, uniform, partial and at points."""
    loads: list[Load] = []
    for span in range(1, len(lengths) + 1):
        loads += [
            UniformLoad("D", span, 24.5 if span != 2 else 27.1),
            UniformLoad("D", span, 5.6),
            UniformLoad("L", span, 18.6),
        ]
    last = len(lengths)
    return [
        *loads,
        PartialLoad("D", 1, 12.0, 0.2 * lengths[0], 0.5 * lengths[0]),
        PointLoad("D", 1, 45e3, 0.5 * lengths[0]),
        PointLoad("L", 1, 60e3, 0.5 * lengths[0]),
        PointLoad("L", 1, 30e3, 0.6 * lengths[0]),
        PointLoad("L", last, 30e3, 0.0),
        PartialLoad("S", last, 8.0, 0.0, 300.0),
    ]


@pytest.mark.parametrize("count", range(1, 7))
def test_loads_are_readable(count: int) -> None:
    """Loads close together, at the very ends, short ones: no text touches anything."""
    lengths = LENGTHS[:count]
    supports = [SIMPLE, *[ELASTIC] * (count - 1), FIXED]
    figure = loads_figure(lengths, supports, all_loads(lengths), {"D": "dead", "L": "live"})

    assert_readable(figure, frozenset({"concrete", "dimensions", "loads"}))


def test_loads_stand_at_their_places() -> None:
    """45 kN at 3.80 m of span 1, 8 kN/m from 1.00 to 3.00 m of span 2: 8.60 to 10.60 m."""
    figure = loads_figure(
        (7600.0, 9200.0), (SIMPLE, ELASTIC, FREE),
        [PointLoad("D", 1, 45e3, 3800.0), PartialLoad("S", 2, 8.0, 1000.0, 3000.0)],
        {"D": "dead"},
    )  # fmt: skip
    (strip,) = [s for s in figure.shapes if isinstance(s, Polyline) and s.layer == "loads"]
    point = [s for s in figure.shapes if isinstance(s, Arrow) and s.head == 2.0]

    assert [x for x, _ in strip.points] == [8600.0, 10600.0, 10600.0, 8600.0]
    assert [(s.start[0], s.end[1] < s.start[1]) for s in point] == [(3800.0, True)]
    assert {"45.0 kN at 3.80", "8.0 kN/m, 1.00 to 3.00", "D  dead", "S"} <= set(words_of(figure))
    assert "dead: 45.0 kN at 3.80" in figure.alt
    assert any("places from the left end of the span, in m" in text for text in words_of(figure))


def test_equal_loads_of_neighbours_are_one() -> None:
    """Three equal uniform loads are one strip with one text; a larger one stands apart."""
    lengths, supports = (5000.0,) * 4, (SIMPLE,) * 5
    loads = [UniformLoad("L", span, 12.0 if span < 4 else 15.0) for span in range(1, 5)]
    said = words_of(loads_figure(lengths, supports, loads))

    assert not any("places" in text for text in said)  # uniform loads have none
    assert said.count("12.0 kN/m") == 1
    assert said.count("15.0 kN/m") == 1


def test_uplift_points_up() -> None:
    """A negative load has a minus and arrows upward."""
    figure = loads_figure((6000.0,), (SIMPLE, SIMPLE), [UniformLoad("W", 1, -3.5)])
    arrows = [s for s in figure.shapes if isinstance(s, Arrow)]

    assert "−3.5 kN/m" in words_of(figure)
    assert all(s.end[1] > s.start[1] for s in arrows)
    assert len(arrows) > 2


def test_texts_in_a_row() -> None:
    """By hand: 10 + 2 mm apart around 22.5; two rows where one is too short for them."""
    assert side_by_side([10.0, 10.0], [20.0, 25.0], 0.0, 100.0, 2.0) == [16.5, 28.5]
    assert side_by_side([10.0, 10.0], [98.0, 99.0], 0.0, 100.0, 2.0) == [83.0, 95.0]
    assert side_by_side([60.0, 60.0], [10.0, 90.0], 0.0, 100.0) == []
    assert [row for row, _ in in_rows([60.0, 60.0], [10.0, 90.0], 0.0, 100.0)] == [0, 1]
