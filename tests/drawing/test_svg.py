"""The SVG of a figure: escaped, deterministic, true to scale, accepted by the PDF compiler."""

from __future__ import annotations

import json
import xml.etree.ElementTree as ET
from dataclasses import replace
from typing import Any

import pytest
import typst
from tests.drawing.extent import extent

from lineproof.drawing import (
    Arc,
    Arrow,
    Circle,
    Dimension,
    Figure,
    Line,
    Polyline,
    Text,
    svg,
    symbol,
    words,
)
from lineproof.drawing.hatch import hatch_lines
from lineproof.drawing.metrics import printable, text_width
from lineproof.drawing.paper import lower

SVG = "{http://www.w3.org/2000/svg}"
SQUARE = ((0.0, 0.0), (400.0, 0.0), (400.0, 400.0), (0.0, 400.0))


def figure_of(*shapes: Any, **changes: Any) -> Figure:
    """Return a field of 100 x 60 mm at 1 to 10 with the drawing's zero at (10, 10) mm."""
    return replace(Figure(100.0, 60.0, 0.1, (10.0, 10.0), shapes, "A test figure."), **changes)


def elements(figure: Figure, tag: str) -> list[ET.Element]:
    """Return all elements of one kind in the SVG."""
    return list(ET.fromstring(svg(figure)).iter(SVG + tag))  # noqa: S314 (our own text)


def everything() -> Figure:
    """Return one shape of every kind."""
    return figure_of(
        Polyline(SQUARE, closed=True, fill="hatch"),
        Line((0.0, 0.0), (400.0, 400.0), "centre", 0.13, "chain"),
        Circle((200.0, 200.0), 12.6),
        Arc((50.0, 50.0), 40.0, 180.0, 270.0),
        Arrow((500.0, 300.0), (500.0, 100.0)),
        Text((600.0, 200.0), (*symbol("f", "c", "′"), (" = 32 MPa", "roman"), ("2", "sup"))),
        Dimension((0.0, 400.0), (400.0, 400.0), "horizontal", 5.0, symbol("b", "w")),
        Dimension((0.0, 0.0), (0.0, 40.0), "vertical", -5.0, words("cover")),
    )


def test_header_gives_paper_size_and_words() -> None:
    """Width and height stand in mm, the view box in the same numbers, title and desc are set."""
    root = ET.fromstring(svg(figure_of(caption="Section <1>")))  # noqa: S314

    assert (root.get("width"), root.get("height")) == ("100mm", "60mm")
    assert root.get("viewBox") == "0 0 100 60"
    assert root.findtext(SVG + "title") == "Section <1>"
    assert root.findtext(SVG + "desc") == "A test figure."


@pytest.mark.parametrize("place", ["text", "alt", "caption", "value"])
def test_markup_in_words_is_escaped(place: str) -> None:
    """A script typed as a label, caption or alternative text stays plain words."""
    evil = '<script>alert("x")</script>&\'"'
    shape = Text((0.0, 0.0), words(evil))
    figure = figure_of(shape, alt=evil, caption=evil)
    if place == "value":
        figure = figure_of(Dimension((0.0, 0.0), (9.0, 0.0), "horizontal", 2.0, value=evil))

    text = svg(figure)

    assert "<script" not in text
    assert "&lt;script&gt;alert(&quot;x&quot;)" in text
    assert not elements(figure, "script")


def test_same_figure_same_bytes() -> None:
    """Two writings agree, and float noise below a thousandth of a mm does not show."""
    noisy = figure_of(Line((0.1 + 0.2, 0.0), (1.0, 1.0)))

    assert svg(everything()) == svg(everything())
    assert svg(noisy) == svg(figure_of(Line((0.3, 0.0), (1.0, 1.0))))
    assert "-0 " not in svg(everything())


def test_circle_is_true_to_scale() -> None:
    """A bar of 25.2 mm at 1 to 10 is 2.52 mm across on paper, its centre where it should be."""
    (circle,) = elements(figure_of(Circle((100.0, 64.0), 12.6)), "circle")

    # x = 10 + 100/10 = 20; y is measured from the top: 60 - (10 + 64/10) = 43.6
    assert (circle.get("cx"), circle.get("cy"), circle.get("r")) == ("20", "43.6", "1.26")


def test_arc_ends() -> None:
    """An arc runs anticlockwise on paper from its start to its end."""
    path = elements(figure_of(Arc((0.0, 0.0), 100.0, 0.0, 90.0)), "path")[0].get("d")

    # from (20, 10) to (10, 20) mm; from the top 50 and 40; sweep flag 0 is anticlockwise in SVG
    assert path == "M20 50A10 10 0 0 0 10 40"


@pytest.mark.parametrize(
    ("start", "end", "direction", "printed"),
    [
        ((0.0, 0.0), (380.0, 0.0), "horizontal", "380"),
        ((380.0, 25.0), (0.0, 0.0), "horizontal", "380"),
        ((0.0, 0.0), (70.0, 556.1), "vertical", "556"),
    ],
)
def test_dimension_prints_what_it_measures(
    start: Any, end: Any, direction: Any, printed: str
) -> None:
    """The text of a dimension is the length between its points, whichever comes first."""
    figure = figure_of(Dimension(start, end, direction, 5.0, symbol("x")))

    assert "".join(elements(figure, "text")[0].itertext()) == f"x = {printed}"


def test_dimension_text_stands_inside_when_it_fits() -> None:
    """A long dimension carries its text between the ticks, a short one beyond its end."""
    _, (inside,) = lower(figure_of(Dimension((0.0, 0.0), (380.0, 0.0), "horizontal", 5.0)))
    _, (beyond,) = lower(figure_of(Dimension((0.0, 0.0), (30.0, 0.0), "horizontal", 5.0)))
    _, (before,) = lower(
        figure_of(Dimension((0.0, 0.0), (30.0, 0.0), "horizontal", 5.0, outside="start"))
    )

    assert inside.at == pytest.approx((29.0, 16.0))
    assert beyond.corners[0][0] > 13.0
    assert before.corners[1][0] < 10.0


def test_vertical_dimension_reads_from_the_right() -> None:
    """A vertical text is turned 90 degrees, and stands upright beside a short dimension."""
    _, (turned,) = lower(figure_of(Dimension((0.0, 0.0), (0.0, 380.0), "vertical", 5.0)))
    _, (beside,) = lower(figure_of(Dimension((0.0, 0.0), (0.0, 20.0), "vertical", -5.0)))

    assert turned.text.rotation == 90.0
    assert (beside.text.rotation, beside.text.anchor) == (0.0, "end")


def test_dimension_text_clears_its_line() -> None:
    """The white field of a dimension text ends above the dimension line."""
    _, (text,) = lower(
        figure_of(Dimension((0.0, 0.0), (380.0, 0.0), "horizontal", 5.0, symbol("b", "w")))
    )
    field = min(y for _, y in text.corners) - 0.25

    assert field > 15.0 + 0.13 / 2


def test_texts_are_drawn_after_all_lines() -> None:
    """No line is drawn across a text, in whatever order the shapes were given."""
    figure = figure_of(Text((0.0, 0.0), words("h")), Line((-50.0, 0.0), (50.0, 0.0)))
    tags = [element.tag.removeprefix(SVG) for element in ET.fromstring(svg(figure))]  # noqa: S314

    assert tags == ["title", "desc", "path", "path", "text"]


def test_subscript_returns_to_the_baseline() -> None:
    """The shifts of a text sum to zero once an upright run follows a subscript."""
    runs = (*symbol("A", "s"), (" = 2500", "roman"))
    spans = elements(figure_of(Text((0.0, 0.0), runs)), "tspan")

    assert [span.text for span in spans] == ["A", "s", " = 2500"]
    assert sum(float(span.get("dy", "0")) for span in spans) == pytest.approx(0.0)
    assert spans[0].get("font-style") == "italic"


def test_unknown_character_prints_its_code_point() -> None:
    """What the font cannot show is printed as a code, control and direction marks too."""
    assert printable("h = 620 🏠") == "h = 620 <U+1F3E0>"
    assert printable("a\u202eb\x00") == "a<U+202E>b<U+0000>"
    assert printable("ε φ α ′ · × − ≤ ² é") == "ε φ α ′ · × − ≤ ² é"


@pytest.mark.parametrize("style", ["roman", "italic"])
def test_text_width_agrees_with_the_compiler(style: Any) -> None:
    """The width table agrees with the compiler's own measure of the bundled font."""
    text = "Mr = 795 kN·m, εφα ≤ −12.5 × 10"
    source = (
        '#set text(font: "Libertinus Serif", size: 10pt, kerning: false, ligatures: false)\n'
        "#context [#metadata(measure(text(style: sys.inputs.style, sys.inputs.text)).width.pt())"
        " <width>]"
    )
    inputs = {"text": text, "style": "normal" if style == "roman" else style}
    fonts = typst.Fonts(include_system_fonts=False)
    answer = typst.query(source.encode(), "<width>", "value", sys_inputs=inputs, font_paths=fonts)

    assert text_width(((text, style),), 10.0) == pytest.approx(json.loads(answer)[0], rel=1e-3)


def test_hatch_covers_the_square_only() -> None:
    """In a 10 mm square the lines at 45 degrees, spacing s, add up to its area over s."""
    lines = hatch_lines(((0.0, 0.0), (10.0, 0.0), (10.0, 10.0), (0.0, 10.0)), spacing=0.1)
    total = sum(((bx - ax) ** 2 + (by - ay) ** 2) ** 0.5 for (ax, ay), (bx, by) in lines)

    assert total * 0.1 == pytest.approx(100.0, rel=1e-3)
    assert all(-1e-9 <= value <= 10 + 1e-9 for line in lines for point in line for value in point)
    assert all(by - ay == pytest.approx(bx - ax) for (ax, ay), (bx, by) in lines)


def test_hatch_leaves_a_notch_free() -> None:
    """A concave polygon is hatched on both sides of its notch, not across it."""
    notched = ((0.0, 0.0), (9.0, 0.0), (9.0, 9.0), (6.0, 9.0), (6.0, 3.0), (3.0, 3.0), (3.0, 9.0),
               (0.0, 9.0))  # fmt: skip
    middles = [
        ((ax + bx) / 2, (ay + by) / 2) for (ax, ay), (bx, by) in hatch_lines(notched, spacing=0.3)
    ]

    assert middles
    assert not [point for point in middles if 3.0 < point[0] < 6.0 and point[1] > 3.0]


def test_extent_counts_line_weight() -> None:
    """The extent of a square outline is the square and half its line weight."""
    figure = figure_of(Polyline(SQUARE, weight=0.5, closed=True))

    assert extent(figure) == pytest.approx((9.75, 9.75, 50.25, 50.25))


def test_every_shape_compiles_to_an_archival_pdf() -> None:
    """All kinds of shape pass the PDF/A-3a and PDF/UA-1 gates with the bundled fonts only."""
    source = (
        '#set document(title: "t")\n#set text(lang: "en")\n'
        '#image(bytes(sys.inputs.figure), format: "svg", alt: "a figure", width: 100mm)'
    )
    pdf = typst.compile(
        source.encode(),
        sys_inputs={"figure": svg(everything())},
        font_paths=typst.Fonts(include_system_fonts=False),
        pdf_standards=["a-3a", "ua-1"],
    )

    assert pdf.startswith(b"%PDF")
    assert b"LibertinusSerif" in pdf
