"""Write a figure as SVG: one self-contained element, same figure same bytes."""

from __future__ import annotations

import math
from html import escape

from lineproof.drawing.interchange import from_json, to_json
from lineproof.drawing.metrics import SUB_DROP, SUB_SIZE, SUP_RISE, printable
from lineproof.drawing.paper import BACKING_MARGIN, DASHES, PaperShape, Placed, lower
from lineproof.drawing.shapes import Arc, Circle, Figure, Line, Point, Polyline, Runs

FONT_FAMILY = "Libertinus Serif"
OTHER_FONTS = "Times New Roman, Times, Liberation Serif, Tinos, serif"
_SHIFTS = {"sub": SUB_DROP, "sup": -SUP_RISE}
_STYLES = {"italic": ' font-style="italic"', "bold": ' font-weight="bold"'}


def svg(figure: Figure, *, any_font: bool = False) -> str:
    """Return the figure as one ``<svg>`` element, sized in mm on paper.

    ``any_font`` is for places that do not carry our font: every text is drawn as wide as it was
    measured, whatever font stands in, so that none is cut off or runs over its neighbour.

    Characters without a glyph print as their code point, such as ``<U+1F600>``. Raises
    :class:`lineproof.errors.UserError` for a figure that :func:`from_json` would refuse.
    """
    figure = from_json(to_json(figure))  # the digits a record keeps, so both draw alike
    drawn, texts = lower(figure)
    width, height = _number(figure.width), _number(figure.height)
    family = f"{FONT_FAMILY}, {OTHER_FONTS}" if any_font else FONT_FAMILY
    lines = [
        (
            f'<svg xmlns="http://www.w3.org/2000/svg" width="{width}mm" height="{height}mm" '
            f'viewBox="0 0 {width} {height}" role="img" aria-label="{_escaped(figure.alt)}" '
            'fill="none" stroke="black" stroke-linecap="butt" stroke-linejoin="miter" '
            f'font-family="{family}" text-rendering="geometricPrecision" xml:space="preserve">'
        ),
        f"<title>{_escaped(figure.caption or figure.alt)}</title>",
        f"<desc>{_escaped(figure.alt)}</desc>",
    ]
    lines.extend(_shape(shape, figure.height) for shape in drawn)
    lines.extend(_backing(text, figure.height) for text in texts if text.text.backing)
    lines.extend(_text(text, figure.height, fitted=any_font) for text in texts)
    lines.append("</svg>")
    return "\n".join(line for line in lines if line) + "\n"


def _escaped(text: str) -> str:
    return escape(printable(text.replace("\n", " ")), quote=True)


def _number(value: float) -> str:
    """Three decimals of a mm, no trailing zeros, no negative zero."""
    text = f"{value:.3f}".rstrip("0").rstrip(".")
    return "0" if text in {"-0", ""} else text


def _xy(point: Point, height: float) -> tuple[str, str]:
    return _number(point[0]), _number(height - point[1])


def _shape(shape: PaperShape, height: float) -> str:
    match shape:
        case Line():
            (x1, y1), (x2, y2) = _xy(shape.start, height), _xy(shape.end, height)
            return f'<path d="M{x1} {y1}L{x2} {y2}"{_stroke(shape)}/>'
        case Polyline():
            path = "L".join(" ".join(_xy(point, height)) for point in shape.points)
            close = "Z" if shape.closed else ""
            return f'<path d="M{path}{close}"{_fill(shape.fill)}{_stroke(shape)}/>'
        case Circle():
            x, y = _xy(shape.centre, height)
            radius = _number(shape.radius)
            weight = f' stroke-width="{_number(shape.weight)}"' if shape.weight else _NO_STROKE
            return f'<circle cx="{x}" cy="{y}" r="{radius}"{_fill(shape.fill)}{weight}/>'
        case Arc():
            return _arc(shape, height)


_HALF_TURN = 180.0
_NO_STROKE = ' stroke="none"'


def _stroke(shape: Line | Polyline | Arc) -> str:
    if not shape.weight:
        return _NO_STROKE
    lengths = " ".join(map(_number, DASHES.get(shape.dash, ())))
    dash = f' stroke-dasharray="{lengths}"' if lengths else ""
    return f' stroke-width="{_number(shape.weight)}"{dash}'


def _fill(fill: str) -> str:
    return "" if fill == "none" else f' fill="{fill}"'


def _arc(arc: Arc, height: float) -> str:
    sweep = (arc.end_angle - arc.start_angle) % 360.0
    start, end = (
        _xy(
            (
                arc.centre[0] + arc.radius * math.cos(math.radians(angle)),
                arc.centre[1] + arc.radius * math.sin(math.radians(angle)),
            ),
            height,
        )
        for angle in (arc.start_angle, arc.end_angle)
    )
    radius, large = _number(arc.radius), int(sweep > _HALF_TURN)
    path = f"M{start[0]} {start[1]}A{radius} {radius} 0 {large} 0 {end[0]} {end[1]}"
    return f'<path d="{path}"{_stroke(arc)}/>'


def _backing(text: Placed, height: float) -> str:
    """White field a little larger than the text, so that a line behind it stays readable."""
    corners = text.corners
    centre = (sum(x for x, _ in corners) / 4, sum(y for _, y in corners) / 4)
    grown = []
    for x, y in corners:
        dx, dy = x - centre[0], y - centre[1]
        grown.append((x + math.copysign(BACKING_MARGIN, dx), y + math.copysign(BACKING_MARGIN, dy)))
    path = "L".join(" ".join(_xy(point, height)) for point in grown)
    return f'<path d="M{path}Z" fill="white" stroke="none"/>'


def _text(text: Placed, height: float, *, fitted: bool) -> str:
    x, y = _xy(text.at, height)
    turn = ""
    if text.text.rotation:
        turn = f' transform="rotate({_number(-text.text.rotation)} {x} {y})"'
    size = text.text.size
    fit = ""
    if fitted and text.width:
        fit = f' textLength="{_number(text.width)}" lengthAdjust="spacingAndGlyphs"'
    return (
        f'<text x="{x}" y="{y}" font-size="{_number(size)}" text-anchor="{text.text.anchor}" '
        f'fill="black" stroke="none"{turn}{fit}>{_spans(text.text.runs, size)}</text>'
    )


def _spans(runs: Runs, size: float) -> str:
    """Write runs as tspans; a shifted run is followed by the way back to the baseline."""
    spans = []
    level = 0.0
    for run, style in runs:
        wanted = _SHIFTS.get(style, 0.0) * size
        move = f' dy="{_number(wanted - level)}"' if wanted != level else ""
        level = wanted
        small = f' font-size="{_number(SUB_SIZE * size)}"' if style in _SHIFTS else ""
        look = f"{_STYLES.get(style, '')}{small}{move}"
        spans.append(f"<tspan{look}>{escape(printable(run))}</tspan>")
    return "".join(spans)
