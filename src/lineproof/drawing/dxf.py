"""Write a figure as DXF: full scale in the figure's own units, same figure same bytes.

Lines, bars and texts stand where the figure puts them; what is measured on paper (text heights,
ticks, dashes, arrow heads) is divided by the scale, so that a plot at that scale equals the page.
"""

from __future__ import annotations

import io
import math
import re
from collections.abc import Iterable
from dataclasses import replace
from typing import TYPE_CHECKING, Any

from lineproof.drawing.dxf_text import dimension_text, mtext
from lineproof.drawing.hatch import SPACING
from lineproof.drawing.interchange import from_json, to_json
from lineproof.drawing.metrics import CAP_HEIGHT
from lineproof.drawing.paper import (
    DASHES,
    EXTENSION_GAP,
    EXTENSION_PAST,
    LINE_PAST,
    TICK,
    PaperShape,
    Placed,
    lower,
)
from lineproof.drawing.shapes import (
    LIGHT,
    MEDIUM,
    OUTLINE,
    TEXT_SIZE,
    THIN,
    Arc,
    Arrow,
    Circle,
    Dimension,
    Figure,
    Line,
    Point,
    Polyline,
    Shape,
    Text,
)

if TYPE_CHECKING:
    from ezdxf.document import Drawing
    from ezdxf.layouts.base import BaseLayout

VERSION = "R2010"
MILLIMETRES, METRIC = 4, 1
BY_LAYER = 256
STYLE = "STRUCTURAL"
FONT = "arial.ttf"
"""Its widths at equal height of capitals are those of the page's font within some percent."""

LAYERS: dict[str, tuple[str, int, float]] = {
    "concrete": ("S-CONCRETE", 7, OUTLINE),
    "bars": ("S-REBAR", 1, MEDIUM),
    "stirrups": ("S-STIRRUPS", 3, MEDIUM),
    "dimensions": ("S-DIMENSIONS", 5, THIN),
    "text": ("S-TEXT", 7, LIGHT),
    "centre": ("S-CENTRELINES", 8, THIN),
    "loads": ("S-LOADS", 6, LIGHT),
    "axes": ("S-AXES", 8, THIN),
    "curve": ("S-CURVES", 30, MEDIUM),
}
"""Of each layer of a figure: name in the DXF, colour by index, usual line weight in mm."""

LINE_TYPES = {"dashed": "DASHED", "long": "LONGDASH", "dotted": "DOTTED", "chain": "CHAIN"}
_WEIGHTS = (
    0, 5, 9, 13, 15, 18, 20, 25, 30, 35, 40, 50, 53, 60, 70, 80, 90, 100, 106, 120, 140, 158, 200,
    211,
)  # fmt: skip
"""Line weights that DXF knows, in hundredths of a mm."""
_CIRCLE_CORNERS = 36
_MASK = 1.2
"""Size of the field that hides what lies under a text, by its height."""

_DATES = re.compile(r"(?<=  9\n)(\$TD\w+)\n 40\n[^\n]*\n")
_FINGERPRINTS = re.compile(r"(?<=  9\n)(\$(?:FINGERPRINT|VERSION)GUID)\n  2\n[^\n]*\n")
_WRITTEN = re.compile(r"(DictionaryVariables\n280\n0\n  1\n[^\n@]*) @ [^\n]*\n")
_DAY = "2451544.5"
_NO_GUID = "{00000000-0000-0000-0000-000000000000}"


def dxf(figure: Figure) -> bytes:
    """Return the figure as a DXF file in its own units at full scale (mm of the member).

    Raises :class:`lineproof.errors.UserError` for a figure that :func:`from_json` would refuse.
    """
    figure = from_json(to_json(figure))  # the digits a record keeps, as on the page
    document = _document(figure)
    writer = _Writer(figure, document.modelspace(), document)
    for shape in figure.shapes:
        writer.draw(shape)
    writer.write_texts()
    # Classes are written in the order of a set, which differs by process, unless they stand.
    for kind in sorted(document.entitydb.dxf_types_in_use()):
        document.classes.add_class(kind)
    stream = io.StringIO()
    document.write(stream)
    return document.encode(_timeless(stream.getvalue()))


def _timeless(text: str) -> str:
    """Take the moment of writing out of a file: dates and ids that are new every time."""
    text = _DATES.sub(rf"\1\n 40\n{_DAY}\n", text)
    text = _FINGERPRINTS.sub(rf"\1\n  2\n{_NO_GUID}\n", text)
    return _WRITTEN.sub(r"\1\n", text)


def _document(figure: Figure) -> Drawing:
    from ezdxf.filemanagement import new  # noqa: PLC0415 - 0.4 s, only a DXF needs it

    document = new(VERSION, units=MILLIMETRES)
    document.header["$MEASUREMENT"] = METRIC
    document.header["$LTSCALE"] = 1 / figure.scale
    document.header["$DIMSCALE"] = 1 / figure.scale
    document.header["$LWDISPLAY"] = 1
    document.styles.add(STYLE, font=FONT)
    for dash, name in LINE_TYPES.items():
        on, *rest = DASHES[dash]
        lengths = [on, *(-part if place % 2 == 0 else part for place, part in enumerate(rest))]
        document.linetypes.add(name, [sum(map(abs, lengths)), *lengths], description=name.title())
    for name, colour, weight in LAYERS.values():
        document.layers.add(name, color=colour, lineweight=_weight(weight))
    _dimension_style(document, figure)
    _view(document, figure)
    return document


def _dimension_style(document: Drawing, figure: Figure) -> None:
    """Make a dimension that is changed in the drawing look as it did on the page."""
    style = document.dimstyles.new(STYLE)
    style.dxf.update(
        {
            "dimscale": 1 / figure.scale, "dimtxsty": STYLE, "dimtxt": CAP_HEIGHT * TEXT_SIZE,
            "dimtsz": TICK, "dimexo": EXTENSION_GAP, "dimexe": EXTENSION_PAST, "dimdle": LINE_PAST,
            "dimgap": 0.6, "dimtad": 1, "dimtih": 0, "dimtoh": 0, "dimdec": 0, "dimzin": 8,
        }
    )  # fmt: skip


def _view(document: Drawing, figure: Figure) -> None:
    """Show the whole field of paper when the file is opened."""
    low = _back(figure, (0.0, 0.0))
    high = _back(figure, (figure.width, figure.height))
    centre = ((low[0] + high[0]) / 2, (low[1] + high[1]) / 2)
    document.set_modelspace_vport(figure.height / figure.scale, center=centre)
    space = document.modelspace()
    space.dxf.extmin, space.dxf.extmax = (*low, 0.0), (*high, 0.0)
    space.dxf.limmin, space.dxf.limmax = low, high


def _back(figure: Figure, point: Point) -> Point:
    """Return where a point of the paper lies in the drawing."""
    x, y = point[0] - figure.origin[0], point[1] - figure.origin[1]
    return x / figure.scale, y / figure.scale


def _weight(millimetres: float) -> int:
    """Return the nearest line weight that DXF knows.

    >>> _weight(0.5), _weight(0.45)
    (50, 40)
    """
    return min(_WEIGHTS, key=lambda known: abs(known - 100 * millimetres))


class _Writer:
    """Writes shapes into a layout, and texts last, so that no line is drawn across them."""

    def __init__(self, figure: Figure, layout: BaseLayout, document: Drawing) -> None:
        self.figure = figure
        self.layout = layout
        self.document = document
        self.texts: list[Placed] = []

    def draw(self, shape: Shape) -> None:
        """Write one shape."""
        match shape:
            case Line():
                self.layout.add_line(shape.start, shape.end, self._look(shape))
            case Polyline():
                self._polyline(shape)
            case Circle():
                self._circle(shape)
            case Arc():
                self.layout.add_arc(
                    shape.centre, shape.radius, shape.start_angle, shape.end_angle,
                    dxfattribs=self._look(shape),
                )  # fmt: skip
            case Dimension():
                self._dimension(shape)
            case Text() | Arrow():
                drawn, texts = self._lowered(shape)
                self._lower_into(self.layout, drawn)
                self.texts.extend(texts)

    def write_texts(self) -> None:
        """Write the texts of the figure."""
        for text in self.texts:
            self._text(self.layout, text)

    def _lowered(self, shape: Shape) -> tuple[list[PaperShape], list[Placed]]:
        """Return a shape as the page draws it, in mm on paper from the drawing's own origin."""
        return lower(replace(self.figure, origin=(0.0, 0.0), shapes=(shape,)))

    def _look(self, shape: Line | Polyline | Circle | Arc | Arrow) -> dict[str, Any]:
        name, _, usual = LAYERS[shape.layer]
        look: dict[str, Any] = {"layer": name}
        if shape.weight and _weight(shape.weight) != _weight(usual):
            look["lineweight"] = _weight(shape.weight)
        dash = getattr(shape, "dash", "solid")
        if dash != "solid":
            look["linetype"] = LINE_TYPES[dash]
        return look

    def _polyline(self, shape: Polyline) -> None:
        if shape.fill == "white":
            self._mask(shape.points, shape.layer)
        elif shape.fill != "none":
            self._fill(shape, shape.points)
        if shape.weight:
            self.layout.add_lwpolyline(
                shape.points, close=shape.closed, dxfattribs=self._look(shape)
            )

    def _circle(self, shape: Circle) -> None:
        if shape.fill == "white":
            self._mask(_corners(shape), shape.layer)
        elif shape.fill == "black":
            hatch = self.layout.add_hatch(BY_LAYER, {"layer": LAYERS[shape.layer][0]})
            hatch.paths.add_edge_path().add_arc(shape.centre, shape.radius, 0, 360)
        self.layout.add_circle(shape.centre, shape.radius, self._look(shape))

    def _fill(self, shape: Polyline, points: Iterable[Point]) -> None:
        hatch = self.layout.add_hatch(BY_LAYER, {"layer": LAYERS[shape.layer][0]})
        hatch.paths.add_polyline_path(points, is_closed=True)
        if shape.fill == "hatch":
            step = SPACING / self.figure.scale * math.sqrt(0.5)
            line = [45.0, _back(self.figure, (0.0, 0.0)), (-step, step), []]
            hatch.set_pattern_fill("ANSI31", color=BY_LAYER, definition=[line])
            hatch.dxf.lineweight = _weight(THIN)

    def _mask(self, points: Iterable[Point], layer: str) -> None:
        """Hide what has been drawn so far under a white field."""
        self.layout.add_wipeout(points, {"layer": LAYERS[layer][0]})

    def _lower_into(self, layout: BaseLayout, drawn: Iterable[PaperShape]) -> None:
        """Write what the page measures on paper: lines and solid heads."""
        for shape in drawn:
            look = self._look(shape)
            if isinstance(shape, Line):
                layout.add_line(self._full(shape.start), self._full(shape.end), look)
            elif isinstance(shape, Polyline):
                layout.add_solid([self._full(point) for point in shape.points], look)

    def _full(self, point: Point) -> Point:
        return point[0] / self.figure.scale, point[1] / self.figure.scale

    def _text(self, layout: BaseLayout, placed: Placed) -> None:
        """Write a text on the middle of its capitals; a field behind it hides lines."""
        text, (x, y) = placed.text, placed.at
        rise, angle = CAP_HEIGHT * text.size / 2, math.radians(text.rotation)
        middle = (x - rise * math.sin(angle), y + rise * math.cos(angle))
        made = layout.add_mtext(mtext(text.runs), {"layer": LAYERS[text.layer][0], "style": STYLE})
        made.dxf.char_height = CAP_HEIGHT * text.size / self.figure.scale
        made.set_location(
            self._full(middle), rotation=text.rotation,
            attachment_point={"start": 4, "middle": 5, "end": 6}[text.anchor],
        )  # fmt: skip
        if text.backing:
            made.set_bg_color("canvas", scale=_MASK)

    def _dimension(self, shape: Dimension) -> None:
        """Write a real dimension that shows the very lines of the page until it is changed."""
        horizontal = shape.direction == "horizontal"
        offset = shape.offset / self.figure.scale
        (x, y), (end_x, end_y) = shape.start, shape.end
        made = self.layout.add_linear_dim(
            base=(end_x, y + offset) if horizontal else (x + offset, end_y),
            p1=shape.start, p2=shape.end, angle=0.0 if horizontal else 90.0,
            text=dimension_text(shape), dimstyle=STYLE,
            dxfattribs={"layer": LAYERS[shape.layer][0]},
        ).dimension  # fmt: skip
        block = self.document.blocks.new_anonymous_block(type_char="D")
        drawn, (text,) = self._lowered(shape)
        self._lower_into(block, drawn)
        self._text(block, text)
        made.dxf.geometry = block.name
        made.dxf.text_midpoint = self._full(text.middle)
        made.dxf.actual_measurement = shape.measured


def _corners(circle: Circle) -> list[Point]:
    (x, y), radius = circle.centre, circle.radius
    angles = [2 * math.pi * place / _CIRCLE_CORNERS for place in range(_CIRCLE_CORNERS)]
    return [(x + radius * math.cos(a), y + radius * math.sin(a)) for a in angles]
