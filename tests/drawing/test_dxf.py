"""A figure as DXF, opened again by ezdxf: true sizes, layers, texts, the same bytes every time."""

from __future__ import annotations

import io
import os
import subprocess
import sys
from typing import TYPE_CHECKING, Any, get_args

import pytest
from ezdxf.filemanagement import read
from hypothesis import given, settings
from hypothesis import strategies as st

from lineproof.drawing import (
    Arc,
    Arrow,
    Circle,
    Dimension,
    Figure,
    Line,
    Polyline,
    Shape,
    Text,
    dxf,
    symbol,
    words,
)
from lineproof.drawing.dxf import LAYERS
from lineproof.drawing.paper import lower
from lineproof.drawing.shapes import Layer
from lineproof.errors import UserError

if TYPE_CHECKING:
    from ezdxf.document import Drawing

SCALE, ORIGIN = 0.02, (10.0, 20.0)  # 1 to 50
LENGTH, DEPTH = 7600.0, 620.0
OUTLINE = ((0.0, 0.0), (LENGTH, 0.0), (LENGTH, DEPTH), (0.0, DEPTH))


def figure(*shapes: Shape) -> Figure:
    return Figure(175.0, 60.0, SCALE, ORIGIN, shapes, "A beam")


def opened(made: Figure) -> Drawing:
    document = read(io.StringIO(dxf(made).decode()))
    audit = document.audit()
    assert audit.errors == []
    assert audit.fixes == []
    return document


def every(layout: Any, kind: str) -> list[Any]:
    return list(layout.query(kind))


def only(document: Drawing, kind: str) -> Any:
    (entity,) = document.modelspace().query(kind)
    return entity


def points(line: Any) -> list[tuple[float, float]]:
    return [(line.dxf.start.x, line.dxf.start.y), (line.dxf.end.x, line.dxf.end.y)]


def test_shapes_stand_at_full_scale_on_their_layers() -> None:
    made = opened(
        figure(
            Polyline(OUTLINE, closed=True),
            Line((40.0, 60.5), (LENGTH - 40.0, 60.5), "bars", 0.5),
            Circle((100.0, 60.0), 12.6),
            Arc((200.0, 300.0), 150.0, 20.0, 200.0, "stirrups"),
        )
    )
    outline, line = only(made, "LWPOLYLINE"), only(made, "LINE")
    circle, arc = only(made, "CIRCLE"), only(made, "ARC")
    assert [tuple(p) for p in outline.get_points("xy")] == list(OUTLINE)
    assert outline.closed
    assert points(line) == [(40.0, 60.5), (7560.0, 60.5)]
    assert (tuple(circle.dxf.center), circle.dxf.radius) == ((100.0, 60.0, 0.0), 12.6)
    assert (tuple(arc.dxf.center), arc.dxf.radius) == ((200.0, 300.0, 0.0), 150.0)
    assert (arc.dxf.start_angle, arc.dxf.end_angle) == (20.0, 200.0)
    assert [e.dxf.layer for e in (outline, line, circle, arc)] == [
        "S-CONCRETE", "S-REBAR", "S-REBAR", "S-STIRRUPS",
    ]  # fmt: skip
    assert made.header["$INSUNITS"] == 4  # millimetres, by the DXF reference of the header
    assert made.header["$MEASUREMENT"] == 1  # metric, as above


@pytest.mark.parametrize("layer", get_args(Layer))
def test_every_layer_of_a_figure_is_a_layer_of_its_own(layer: Layer) -> None:
    made = opened(figure(Line((0, 0), (1, 1), layer), Text((0, 0), words("x"), layer)))
    name, colour, weight = LAYERS[layer]
    assert {e.dxf.layer for e in made.modelspace()} == {name}
    found = made.layers.get(name)
    assert found.color == colour
    assert found.dxf.lineweight == round(100 * weight)


def test_layers_do_not_share_a_name() -> None:
    assert set(LAYERS) == set(get_args(Layer))
    assert len({name for name, _, _ in LAYERS.values()}) == len(LAYERS)


def test_weights_and_dashes() -> None:
    made = opened(
        figure(
            Line((0, 0), (1, 0), "bars", 0.3),
            Line((0, 0), (1, 0), "bars", 0.5, "chain"),
            Line((0, 0), (1, 0), "bars", 0.45, "dashed"),
        )
    )
    usual, heavy, between = made.modelspace().query("LINE")
    by_layer = -1
    assert usual.dxf.get("lineweight", by_layer) == by_layer
    assert usual.dxf.get("linetype", "BYLAYER") == "BYLAYER"
    assert (heavy.dxf.lineweight, heavy.dxf.linetype) == (50, "CHAIN")
    assert (between.dxf.lineweight, between.dxf.linetype) == (40, "DASHED")
    # On paper 5 mm drawn, 1 left out, 0.9 drawn, 1 left out; 50 times as long in the drawing.
    pattern = made.linetypes.get("CHAIN").pattern_tags.tags
    assert [tag.value for tag in pattern if tag.code == 49] == [5.0, -1.0, 0.9, -1.0]
    assert made.header["$LTSCALE"] == pytest.approx(50.0)


def test_fills_are_hatches_and_white_hides_what_is_below() -> None:
    triangle = ((0.0, 0.0), (500.0, 0.0), (0.0, 500.0))
    made = opened(
        figure(
            Polyline(OUTLINE, closed=True, fill="hatch"),
            Polyline(triangle, closed=True, fill="black", weight=0.0),
            Circle((900.0, 300.0), 50.0, "bars", 0.3, "white"),
            Circle((1200.0, 300.0), 50.0),
        )
    )
    pattern, solid, bar = every(made.modelspace(), "HATCH")
    assert (pattern.dxf.solid_fill, solid.dxf.solid_fill, bar.dxf.solid_fill) == (0, 1, 1)
    (lines,) = pattern.pattern.lines
    assert lines.angle == 45.0
    # The page's lines stand 1.1 mm apart: 1.1*50 = 55 mm in the drawing, at 45 degrees.
    assert (lines.offset.x, lines.offset.y) == pytest.approx((-55 / 2**0.5, 55 / 2**0.5))
    assert len(made.modelspace().query("WIPEOUT")) == 1
    assert len(made.modelspace().query("LWPOLYLINE")) == 1, "weight 0 draws no outline"
    order = [entity.dxftype() for entity in made.modelspace()]
    assert order.index("WIPEOUT") > order.index("HATCH")


def test_texts_are_sized_for_the_scale_and_come_last() -> None:
    made = opened(
        figure(
            Text((3800.0, 900.0), symbol("d", "b"), size=3.0),
            Line((0, 0), (1, 1)),
            Text((0.0, 0.0), words("5-25M"), anchor="start", valign="baseline", rotation=90.0),
        )
    )
    assert [e.dxftype() for e in made.modelspace()] == ["LINE", "MTEXT", "MTEXT"]
    mark, bars = every(made.modelspace(), "MTEXT")
    assert mark.plain_text() == "d_b"
    assert (mark.dxf.insert.x, mark.dxf.insert.y) == pytest.approx((3800.0, 900.0))
    # Capitals of a text of 3 mm are 0.66*3 mm high: 1.98*50 = 99 mm in the drawing.
    assert mark.dxf.char_height == pytest.approx(99.0)
    assert (mark.dxf.attachment_point, bars.dxf.attachment_point) == (5, 4)
    # The middle of capitals 0.66*2.8*50 = 92.4 mm high, turned to the left of the baseline.
    assert (bars.dxf.insert.x, bars.dxf.insert.y) == pytest.approx((-46.2, 0.0))
    assert bars.dxf.rotation == 90.0


@pytest.mark.parametrize(
    ("runs", "plain"),
    [
        (symbol("A", "s,min"), "A_s,min"),
        (symbol("f", "c", "′"), "f'_c"),
        ((("I", "italic"), ("e", "sub"), (" mm", "roman"), ("4", "sup")), "I_e mm^4"),
        (words("12\u2009000 mm"), "12 000 mm"),
        (words("25M @ 200, Ø11 – γ"), "25M @ 200, Ø11 – γ"),
    ],
)
def test_symbols_are_readable_as_plain_text(runs: Any, plain: str) -> None:
    assert only(opened(figure(Text((0, 0), runs))), "MTEXT").plain_text() == plain


HOSTILE = [
    r"\P new \pxqc; \A1; \S1/2; \U+00E4 \M+18140", "{\\fArial|b1; bold}", "100%% %%c %%d %%p %%%%u",
    "^I tab ^J ^", "<> and []", "  0\\nSECTION", "$TDUPDATE", "a; b", "}", "\\",
    "1.4.5 @ 2026-01-01T00:00:00+00:00", "😀",
]  # fmt: skip


@pytest.mark.parametrize("text", HOSTILE)
def test_hostile_text_comes_out_literally(text: str) -> None:
    made = opened(figure(Text((0, 0), words(text)), Dimension((0, 0), (9, 0), "horizontal", 5,
                                                              words(text))))  # fmt: skip
    assert only(made, "MTEXT").plain_text() == text
    dimension = only(made, "DIMENSION")
    (drawn,) = every(made.blocks.get(dimension.dxf.geometry), "MTEXT")
    assert drawn.plain_text() == f"{text} 9"


@given(st.text(st.characters(exclude_categories=["Cc", "Cs"]), min_size=1, max_size=60))
@settings(max_examples=40, deadline=None)
def test_any_text_comes_out_literally(text: str) -> None:
    shown = text.replace("\u2009", " ").replace("\u202f", " ").replace("′", "'")
    if "′" not in text:
        assert only(opened(figure(Text((0, 0), words(text)))), "MTEXT").plain_text() == shown


def test_control_characters_are_refused() -> None:
    with pytest.raises(UserError, match="without control characters"):
        dxf(figure(Text((0, 0), words("two\nlines"))))


def test_a_dimension_is_real_and_shows_the_lines_of_the_page() -> None:
    drawn = Dimension((0, 0), (LENGTH, 0), "horizontal", -8.0, symbol("L", "n"))
    made = opened(figure(drawn))
    dimension = only(made, "DIMENSION")
    assert dimension.dxf.layer == "S-DIMENSIONS"
    assert dimension.dxf.actual_measurement == pytest.approx(LENGTH)
    assert dimension.get_measurement() == pytest.approx(LENGTH)
    assert dimension.dxf.text == "L_n = <>", "measured again when the drawing is changed"
    assert tuple(dimension.dxf.defpoint2) == (0.0, 0.0, 0.0)
    assert tuple(dimension.dxf.defpoint3) == (LENGTH, 0.0, 0.0)
    assert dimension.dxf.defpoint.y == pytest.approx(-400.0)  # 8 mm on paper at 1 to 50
    block = made.blocks.get(dimension.dxf.geometry)
    assert [e.plain_text() for e in every(block, "MTEXT")] == ["L_n = 7600"]
    on_page, _ = lower(figure(drawn))
    wanted = [
        [((x - 10) * 50, (y - 20) * 50) for x, y in (line.start, line.end)]
        for line in on_page
        if isinstance(line, Line)
    ]
    found = [points(line) for line in block.query("LINE")]
    assert len(found) == len(wanted) == 5
    for line, other in zip(found, wanted, strict=True):
        assert line == [pytest.approx(point, abs=1e-6) for point in other]


def test_a_dimension_not_to_scale_keeps_its_text() -> None:
    made = opened(figure(Dimension((0, 0), (0, 500), "vertical", 6.0, symbol("b", "f"), "<3100>")))
    dimension = only(made, "DIMENSION")
    assert dimension.dxf.text == "b_f = <3100>"
    assert dimension.dxf.angle == 90.0
    assert dimension.dxf.defpoint.x == pytest.approx(300.0)  # 6 mm on paper at 1 to 50


def test_an_arrow_has_a_solid_head() -> None:
    made = opened(figure(Arrow((1000.0, 1500.0), (1000.0, DEPTH), head=2.0)))
    line, head = only(made, "LINE"), only(made, "SOLID")
    # A head of 2 mm on paper is 100 mm long at 1 to 50.
    assert points(line) == [
        pytest.approx((1000.0, 1500.0)), pytest.approx((1000.0, DEPTH + 100.0))
    ]  # fmt: skip
    assert (head.dxf.vtx0.x, head.dxf.vtx0.y) == pytest.approx((1000.0, DEPTH))


def whole() -> Figure:
    """Return a figure with a shape of every kind."""
    return figure(
        Polyline(OUTLINE, closed=True, fill="hatch"),
        Line((0.0, 310.0), (LENGTH, 310.0), "centre", 0.13, "chain"),
        Circle((100.0, 60.0), 12.6),
        Circle((300.0, 60.0), 50.0, "bars", 0.3, "white"),
        Arc((200.0, 300.0), 150.0, 20.0, 200.0, "stirrups"),
        Arrow((1000.0, 1500.0), (1000.0, DEPTH)),
        Text((1000.0, 1600.0), symbol("P", "f")),
        Dimension((0.0, 0.0), (LENGTH, 0.0), "horizontal", -8.0, symbol("L", "n")),
        Dimension((LENGTH, 0.0), (LENGTH, DEPTH), "vertical", 8.0),
    )


_SCRIPT = """
import sys
sys.path.insert(0, sys.argv[1])
from test_dxf import dxf, whole
sys.stdout.buffer.write(dxf(whole()))
"""


def test_same_figure_same_bytes() -> None:
    """Also in another process, at another time, with another order of hashes."""
    here = os.path.dirname(__file__)  # noqa: PTH120 - goes to sys.path
    made = [
        subprocess.run(
            [sys.executable, "-c", _SCRIPT, here],
            env=os.environ | {"PYTHONHASHSEED": seed}, capture_output=True, check=True,
        ).stdout
        for seed in ("1", "2")
    ]  # fmt: skip
    assert made[0] == made[1] == dxf(whole())
    assert b"@ 20" not in made[0]
