"""Section of a beam to scale: outline, stirrup, bars and dimensions (all lengths in mm)."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

from lineproof.beams.figure_section_concrete import (
    Shown,
    choose_scale,
    outline,
)
from lineproof.beams.section_shape import BarRow, SectionShape, SkinBars, SlabBars
from lineproof.drawing import (
    TEXT_SIZE,
    THIN,
    Arc,
    Arrow,
    Circle,
    Dimension,
    Figure,
    Line,
    Point,
    Shape,
    Text,
    symbol,
    words,
)
from lineproof.drawing.axes import spread
from lineproof.drawing.metrics import text_width
from lineproof.drawing.paper import BESIDE_GAP, FIT_MARGIN

PAGE_WIDTH = 165.0
CALLOUT_REACH = 9.0


def bar_places(
    shape: SectionShape, row: BarRow, edge: float, outer: Sequence[float] = ()
) -> tuple[float, ...]:
    """Return the x of each bar of a row whose outer bars touch the stirrup at ``edge`` mm.

    Bars of a second row stand in line with bars of the ``outer`` row where symmetry allows.
    """
    first = edge + row.diameter / 2
    if row.count == 1:
        return (shape.b_w / 2,)
    half = row.count // 2
    if len(outer) >= row.count and (row.count % 2 == 0 or len(outer) % 2 == 1):
        middle = (outer[len(outer) // 2],) if row.count % 2 else ()
        return (*outer[:half], *middle, *outer[len(outer) - half :])
    step = (shape.b_w - 2 * first) / (row.count - 1)
    return tuple(first + number * step for number in range(row.count))


def bars(shape: SectionShape, rows: Sequence[BarRow], edge: float) -> list[Circle]:
    """Draw rows of bars (outermost row first) as solid circles of their true diameter."""
    circles: list[Circle] = []
    outer: tuple[float, ...] = ()
    for row in rows:
        places = bar_places(shape, row, edge, outer)
        outer = outer or places
        y = shape.h - row.depth
        circles.extend(Circle((x, y), row.diameter / 2, "bars") for x in places)
    return circles


def slab_bars(shape: SectionShape, shown: Shown, row: SlabBars) -> list[Circle]:
    """Draw the top bars spread in the overhangs, evenly over their width as far as it is drawn."""
    y = shape.h - row.depth
    circles: list[Circle] = []
    for face, way, stub in ((0.0, -1.0, shown.left), (shape.b_w, 1.0, shown.right)):
        step = min(row.width, stub) / row.count
        places = [face + way * (number + 0.5) * step for number in range(row.count)] if stub else []
        circles.extend(Circle((x, y), row.diameter / 2, "bars") for x in places)
    return circles


def skin_bars(shape: SectionShape, skin: SkinBars) -> list[Circle]:
    """Draw the skin bars of both side faces, evenly over the height of their strip."""
    step = skin.height / skin.count
    heights = [skin.bottom + (number + 0.5) * step for number in range(skin.count)]
    sides = (skin.side, shape.b_w - skin.side)
    return [Circle((x, y), skin.diameter / 2, "bars") for y in heights for x in sides]


def stirrup(
    shape: SectionShape, cover: float, diameter: float, radii: tuple[float, float]
) -> list[Shape]:
    """Draw a closed stirrup as two rounded outlines; ``radii`` inside, bottom and top, mm."""
    shapes: list[Shape] = []
    for inset, grown in ((cover, diameter), (cover + diameter, 0.0)):
        x0, x1, y0, y1 = inset, shape.b_w - inset, inset, shape.h - inset
        low, high = radii[0] + grown, radii[1] + grown
        shapes.extend(
            Line(a, b, "stirrups", THIN * 1.4)
            for a, b in (
                ((x0 + low, y0), (x1 - low, y0)),
                ((x1, y0 + low), (x1, y1 - high)),
                ((x1 - high, y1), (x0 + high, y1)),
                ((x0, y1 - high), (x0, y0 + low)),
            )
        )
        corners = (
            (x0 + low, y0 + low, low, 180.0),
            (x1 - low, y0 + low, low, 270.0),
            (x1 - high, y1 - high, high, 0.0),
            (x0 + high, y1 - high, high, 90.0),
        )
        shapes.extend(
            Arc((x, y), radius, angle, angle + 90.0, "stirrups", THIN * 1.4)
            for x, y, radius, angle in corners
        )
    return shapes


@dataclass(frozen=True, slots=True)
class _Content:
    """What stands in the concrete (mm), as given to :func:`section_figure`."""

    d: float
    cover: float
    stirrup_diameter: float
    stirrup_label: str
    bottom: Sequence[BarRow]
    top: Sequence[BarRow]
    slab: SlabBars | None = None
    skin: SkinBars | None = None

    @property
    def edge(self) -> float:
        """Inner face of the stirrup from the face of the concrete."""
        return self.cover + self.stirrup_diameter

    @property
    def labels(self) -> tuple[str, ...]:
        skin = self.skin.label if self.skin else ""
        return (*(row.label for row in (*self.bottom, *self.top)), self.stirrup_label, skin)


def section_figure(
    shape: SectionShape,
    *,
    d: float,
    cover: float,
    stirrup_diameter: float,
    stirrup_label: str = "",
    bottom: Sequence[BarRow] = (),
    top: Sequence[BarRow] = (),
    slab: SlabBars | None = None,
    skin: SkinBars | None = None,
    caption: str = "Section",
) -> Figure:
    """Draw a section to scale with bars, stirrup and dimensions.

    Lengths in mm; ``bottom`` and ``top`` name the outermost row first. The alternative text is
    written from the numbers.
    """
    content = _Content(d, cover, stirrup_diameter, stirrup_label, bottom, top, slab, skin)
    reach = (
        CALLOUT_REACH + 2.0 + max(text_width(words(label), TEXT_SIZE) for label in content.labels)
    )
    shown = choose_scale(shape, PAGE_WIDTH - reach - 36.0)
    first = _first_offset(shape, shown, content)
    right = first + 12.0
    beyond = {"rectangle": 2.0, "L": 2.0, "T": 9.0 if _upright(shape, shown) else 20.0}
    left = max(beyond[shape.kind] + shown.left * shown.scale, reach)
    width = left + (shape.b_w + shown.right) * shown.scale + right
    shapes = [
        *outline(shape, shown),
        *_steel(shape, shown, content),
        *_dimensions(shape, shown, content),
        *_callouts(shape, shown, content),
        _note(shown, (width / 2 - left) / shown.scale),
    ]
    return Figure(
        round(width, 1),
        round(shape.h * shown.scale + (27.0 if shape.kind != "rectangle" else 20.0), 1),
        shown.scale,
        (round(left, 3), 17.0),
        tuple(shapes),
        _alt(shape, content),
        caption,
    )


def _first_offset(shape: SectionShape, shown: Shown, content: _Content) -> float:
    """Offset of the dimension d, clear of what stands between it and the concrete.

    A T has the names of its top bars there, an L its h_f, written upright or beside.
    """
    if shape.kind == "rectangle":
        return 7.0
    if shape.kind == "T":
        names = max((text_width(words(row.label), TEXT_SIZE) for row in content.top), default=0.0)
        return max(7.0, CALLOUT_REACH + names + 5.0 - shown.right * shown.scale)
    return 15.0 if _upright(shape, shown) else 9.5 + BESIDE_GAP + _slab_text(shape)


def _slab_text(shape: SectionShape) -> float:
    """Width of the text of h_f, mm on paper."""
    return text_width((*symbol("h", "f"), (f" = {shape.h_f:.0f}", "roman")), TEXT_SIZE)


def _upright(shape: SectionShape, shown: Shown) -> bool:
    """Tell whether the text of h_f fits along its dimension."""
    return shape.h_f * shown.scale >= _slab_text(shape) + FIT_MARGIN


def _steel(shape: SectionShape, shown: Shown, content: _Content) -> list[Shape]:
    """Stirrup, its corners bent to the bars that stand in them, and the bars."""
    bottom, top = content.bottom, content.top
    low, high = (
        rows[0].diameter / 2 if rows else 2.0 * content.stirrup_diameter for rows in (bottom, top)
    )
    loop = content.stirrup_diameter > 0.0
    links = stirrup(shape, content.cover, content.stirrup_diameter, (low, high)) if loop else []
    beside = slab_bars(shape, shown, content.slab) if content.slab else []
    rows = [*bars(shape, bottom, content.edge), *bars(shape, top, content.edge)]
    return [*links, *rows, *beside, *(skin_bars(shape, content.skin) if content.skin else [])]


def _note(shown: Shown, centre: float) -> Text:
    note = f"Dimensions in mm, scale 1 : {1 / shown.scale:g}"
    if shown.shortened:
        note += ", flange shortened"
    return Text((centre, -14.5 / shown.scale), words(note), size=2.6)


def _dimensions(shape: SectionShape, shown: Shown, content: _Content) -> list[Shape]:
    b, h = shape.b_w, shape.h
    x0, x1 = -shown.left, b + shown.right
    cover, steel = content.cover, bars(shape, content.bottom, content.edge)
    steel_x = max((bar.centre[0] + bar.radius for bar in steel), default=b)
    first = _first_offset(shape, shown, content)
    shapes: list[Shape] = [
        Dimension((x1, h), (steel_x, h - content.d), "vertical", first, symbol("d")),
        Dimension((x1, h), (b, 0.0), "vertical", first + 7.0, symbol("h")),
        Dimension((0.0, 0.0), (b, 0.0), "horizontal", -7.0, symbol("b", "w")),
        Dimension((0.0, 0.0), (cover, cover), "vertical", -5.0, words("cover")),
    ]
    if shape.kind != "rectangle":
        value = f"{shape.b_f:.0f}" if shown.shortened else ""
        end = x1 if shape.kind == "L" else x0
        offset = 7.0 if shape.kind == "L" else -5.0
        shapes += [
            Dimension((x0, h), (x1, h), "horizontal", 5.5, symbol("b", "f"), value),
            Dimension((end, h - shape.h_f), (end, h), "vertical", offset, symbol("h", "f")),
        ]
    return shapes


def _callouts(shape: SectionShape, shown: Shown, content: _Content) -> list[Shape]:
    """Name bars and stirrups at the left of the web; the top bars of a T at its right."""
    edge = content.edge
    top = [(row.label, (edge, shape.h - row.depth)) for row in content.top]
    low = [(row.label, (edge, shape.h - row.depth)) for row in content.bottom]
    if content.skin:
        target = (content.skin.side, content.skin.bottom + content.skin.height / 2)
        low.append((content.skin.label, target))
    if content.stirrup_label:
        leg = edge - content.stirrup_diameter / 2
        low.append((content.stirrup_label, (leg, 0.4 * shape.h)))
    if shape.kind != "T":
        return _named(shape, shown, [*top, *low], left=True)
    mirrored = [(label, (shape.b_w - x, y)) for label, (x, y) in top]
    return [
        *_named(shape, shown, low, left=True),
        *_named(shape, shown, mirrored, left=False),
    ]


def _named(
    shape: SectionShape, shown: Shown, targets: Sequence[tuple[str, Point]], *, left: bool
) -> list[Shape]:
    unit = 1.0 / shown.scale
    below = shape.h_f + 4.0 * unit if shape.kind == "T" else 2.0 * unit
    ceiling, floor = shape.h - below, 7.0 * unit
    wanted = [min(ceiling, y) for _, (_, y) in targets]
    face, way = (0.0, -unit) if left else (shape.b_w, unit)
    shapes: list[Shape] = []
    for (label, target), y in zip(targets, spread(wanted, 5.0 * unit, floor, ceiling), strict=True):
        start = (face + (CALLOUT_REACH - 1.5) * way, y)
        at = (start[0] + 0.8 * way, y)
        shapes.append(Text(at, words(label), anchor="end" if left else "start"))
        shapes.append(Arrow(start, target, "text", THIN, 1.3))
    return shapes


def _alt(shape: SectionShape, content: _Content) -> str:
    """Say in words what the section shows."""
    name = {"rectangle": "Rectangular section", "T": "T section", "L": "L section"}[shape.kind]
    parts = [f"{name}, width of web {shape.b_w:.0f} mm, overall depth {shape.h:.0f} mm"]
    if shape.kind != "rectangle":
        parts.append(f"flange {shape.b_f:.0f} mm wide and {shape.h_f:.0f} mm thick")
    parts.append(f"effective depth {content.d:.0f} mm, cover {content.cover:.0f} mm")
    for place, rows in (("bottom", content.bottom), ("top", content.top)):
        if rows:
            parts.append(f"{place} bars {' and '.join(row.label for row in rows)}")
    if content.stirrup_label:
        parts.append(content.stirrup_label)
    return ", ".join(parts) + "."
