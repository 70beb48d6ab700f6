"""Sections of a beam drawn from its bars: what is present at a station, to scale [mm]."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

from lineproof.beams.continuous.figure_cross_section_steel import (
    Steel,
    overhang_circles,
    side_circles,
    steel_at,
    stirrup_shapes,
    web_circles,
)
from lineproof.beams.continuous.layout import BarRun, BeamOutline, Detailing, Face
from lineproof.beams.figure_section_concrete import Shown, choose_scale, outline
from lineproof.beams.section_shape import SectionShape
from lineproof.drawing import (
    TEXT_SIZE,
    THIN,
    Arrow,
    Circle,
    Dimension,
    Figure,
    Point,
    Runs,
    Shape,
    Text,
    symbol,
    words,
)
from lineproof.drawing.axes import spread
from lineproof.drawing.metrics import text_width
from lineproof.drawing.paper import BESIDE_GAP, FIT_MARGIN

ROOM = 95.0
TALLEST = 48.0
REACH = 8.0
"""From the face of the web to the names of bars, mm on paper."""
BELOW = 16.0
NOTE = 2.6
"""Height of the note under a section, mm on paper."""
LINE, CLOSEST = 4.6, 3.5
"""From one name of bars to the next, and where there is little room."""
UNDER = 4.5
"""From the soffit to names under it, past the text of the cover."""
NEXT, FLANGE_OFFSET = 6.5, 4.5
"""From one dimension line to the next, and from the flange of a T to its thickness."""


@dataclass(frozen=True, slots=True)
class Named:
    """A name with the point its arrow shows."""

    runs: Runs
    target: Point


def section_at(
    outline_: BeamOutline,
    detailing: Detailing,
    x: float,
    *,
    letter: str = "",
    tension: Face = "bottom",
    aggregate: float = 20.0,
    stirrup: str = "",
    title: str = "",
) -> Figure:
    """Draw the section at the station ``x`` with the bars and stirrups that stand there.

    ``tension`` tells from which side the effective depth is measured; ``aggregate`` is the
    largest aggregate, which sets the distance between layers. Bars are placed in the bends of
    the stirrup as the check of their clear distance has them, of the size ``stirrup`` where none
    stand.
    """
    steel = steel_at(outline_, detailing, x, aggregate, stirrup)
    shape = _shape(outline_, steel.span)
    shown = choose_scale(shape, ROOM, TALLEST)
    circles = web_circles(steel)
    flange = overhang_circles(steel, shape, shown)
    sides = side_circles(steel)
    left, right = _names(steel, circles, flange, sides, all_left=shape.kind == "rectangle")
    note = f"At {x:.0f} mm from the axis of support 1. Scale 1 : {1 / shown.scale:g}"
    note += ", flange shortened." if shown.shortened else "."
    paper = _paper(shape, shown, left, right, text_width(words(note), NOTE) + 2.0)
    under = ((paper.width / 2 - paper.margin) / shown.scale, (3.0 - paper.below) / shown.scale)
    shapes: list[Shape] = [
        *outline(shape, shown, goes_on=True),
        *stirrup_shapes(steel),
        *(circle for _, circle in (*circles, *flange, *sides)),
        *_dimensions(shape, shown, steel, paper.first, tension, [c for _, c in circles]),
        *_callouts(shape, shown, left, way=-1.0),
        *_callouts(shape, shown, right, way=1.0),
        Text(under, words(note), "text", NOTE),
    ]
    name = title or f"Section {letter}".strip()
    return Figure(
        round(paper.width, 1),
        round(shape.h * shown.scale + paper.below + paper.above, 1),
        shown.scale,
        (round(paper.margin, 3), round(paper.below, 3)),
        tuple(shapes),
        _alt(name, x, shape, steel),
        name,
    )


@dataclass(frozen=True, slots=True)
class _Paper:
    """Room around the web, mm on paper: left of it, below the soffit, above the top.

    ``first`` is from the web to the first dimension line right of it, ``width`` that of the figure.
    """

    margin: float
    width: float
    first: float
    below: float
    above: float


def _paper(
    shape: SectionShape, shown: Shown, left: Sequence[Named], right: Sequence[Named], note: float
) -> _Paper:
    """Return the room for names, dimensions and the note under them, which is ``note`` wide."""
    first = REACH + _widest(right) + 4.0 if right else 7.0
    first = max(first, shown.right * shown.scale + 6.0)
    thickness = _thickness_text(shape, shown) if shape.kind != "rectangle" else 0.0
    over = shown.left * shown.scale + FLANGE_OFFSET + thickness + 1.0 if shape.kind == "T" else 0.0
    margin = max(REACH + _widest(left) + 2.0, over)
    past = NEXT + thickness + 1.0 if shape.kind == "L" else 0.0
    width = margin + shape.b_w * shown.scale + first + NEXT + max(past, 5.5)
    margin += max(note - width, 0.0) / 2
    lowest = min(
        _heights(shape, shown, len(left), -1.0)[0], _heights(shape, shown, len(right), 1.0)[0]
    )
    below = max(BELOW, 8.0 - lowest * shown.scale)
    return _Paper(
        margin, max(width, note), first, below, 5.0 if shape.kind == "rectangle" else 12.0
    )


def _widest(names: Sequence[Named]) -> float:
    return max((text_width(name.runs, TEXT_SIZE) for name in names), default=0.0)


def sections_of(
    outline_: BeamOutline, detailing: Detailing, *, aggregate: float = 20.0, stirrup: str = ""
) -> tuple[tuple[str, float, Figure], ...]:
    """Return letter, station and figure of the sections of a beam: spans and faces of supports.

    A section with the same bars as one before it is not drawn again.
    """
    places: list[tuple[float, Face, str]] = []
    for span in range(1, len(outline_.lengths) + 1):
        start, end = outline_.faces(span)
        free = [outline_.supports[n].kind == "free" for n in (span - 1, span)]
        places += [] if free[0] else [(start, "top", f"span {span}, at support {span}")]
        if not any(free):
            places.append(((start + end) / 2, "bottom", f"span {span}, midspan"))
        places += [] if free[1] else [(end, "top", f"span {span}, at support {span + 1}")]
    found: list[tuple[str, float, Figure]] = []
    seen: set[object] = set()
    for x, tension, where in places:
        key = (tension, *steel_at(outline_, detailing, x, aggregate).signature)
        if key in seen:
            continue
        seen.add(key)
        letter = _letter(len(found))
        figure = section_at(
            outline_, detailing, x, tension=tension, aggregate=aggregate, stirrup=stirrup,
            title=f"Section {letter}: {where}",
        )  # fmt: skip
        found.append((letter, x, figure))
    return tuple(found)


def _letter(number: int) -> str:
    """Return A to Z, then AA, AB; I and O are left out, as on drawings."""
    letters = "ABCDEFGHJKLMNPQRSTUVWXYZ"
    more, last = divmod(number, len(letters))
    return (letters[more - 1] if more else "") + letters[last]


def _shape(outline_: BeamOutline, span: int) -> SectionShape:
    kind = outline_.shape
    depth = outline_.depths[span - 1]
    if kind == "rectangular":
        return SectionShape("rectangle", outline_.b_w, depth)
    return SectionShape(kind, outline_.b_w, depth, outline_.widths[span - 1], outline_.h_f)


def _label(run: BarRun) -> Runs:
    text = f"{run.number}-{run.size}{' side faces' if run.place == 'side face' else ''}"
    return ((f"{run.mark} ", "bold"), (text, "roman")) if run.mark else words(text)


def _flange_label(flange: Placed) -> Runs:
    """Name all runs in the overhangs in one line: an arrow to a second would cross the first."""
    made: Runs = ()
    for run in dict.fromkeys(run for run, _ in flange):
        made = (*made, *(words(", ") if made else ()), *_label(run))
    return (*made, *words(" in flange"))


Placed = Sequence[tuple[BarRun, Circle]]


def _names(
    steel: Steel, web: Placed, flange: Placed, sides: Placed, *, all_left: bool
) -> tuple[list[Named], list[Named]]:
    """Name bottom bars, side bars and stirrups at the left, top bars beside a flange right.

    A face without bars says so in their place.
    """
    left: list[Named] = []
    right: list[Named] = []
    corner = min if all_left else max
    for run in steel.runs:
        mine = [c.centre for owner, c in (*web, *flange, *sides) if owner is run]
        if not mine:
            continue
        if run.face == "bottom" or run.place == "side face":
            left.append(Named(_label(run), min(mine)))
        elif run.place == "web":
            (left if all_left else right).append(Named(_label(run), corner(mine)))
    if flange:
        points = [circle.centre for _, circle in flange]
        right.append(Named(_flange_label(flange), _near(points, steel.outline.b_w)))
    inset, faces = (
        steel.cover + steel.stirrup,
        {run.face for run in steel.runs if run.place != "side face"},
    )
    if "bottom" not in faces:
        left.append(Named(words("no bottom bars"), (0.0, inset)))
    if "top" not in faces:
        at = 0.0 if all_left else steel.outline.b_w
        named = Named(words("no top bars"), (at, steel.depth - inset))
        (left if all_left else right).append(named)
    if steel.zone is not None:
        zone = steel.zone
        mark: Runs = ((f"{zone.mark} ", "bold"),) if zone.mark else ()
        spacing = f" @ {zone.spacing:.0f}" if zone.number > 1 else ""
        legs = f", {zone.legs} legs" if zone.legs > 2 else ""  # noqa: PLR2004 - usual stirrup
        leg = steel.cover + steel.stirrup / 2
        runs: Runs = (*mark, (f"{zone.size}{spacing}{legs}", "roman"))
        left.append(Named(runs, (leg, 0.45 * steel.depth)))
    return left, right


def _thickness_text(shape: SectionShape, shown: Shown) -> float:
    """Paper that the text of h_f takes beside its dimension."""
    runs: Runs = (*symbol("h", "f"), (f" = {shape.h_f:.0f}", "roman"))
    width = text_width(runs, TEXT_SIZE)
    upright = width + FIT_MARGIN <= shape.h_f * shown.scale
    return 3.5 if upright else BESIDE_GAP + width


def _near(points: Sequence[Point], face: float) -> Point:
    """Bar in the right overhang that is nearest the web."""
    return min((point for point in points if point[0] > face), default=points[0])


def _callouts(shape: SectionShape, shown: Shown, names: Sequence[Named], way: float) -> list[Shape]:
    unit = 1.0 / shown.scale
    floor, ceiling = _heights(shape, shown, len(names), way)
    wanted = [min(max(name.target[1], floor), ceiling) + _rank(shape, name, way) for name in names]
    face = 0.0 if way < 0.0 else shape.b_w
    shapes: list[Shape] = []
    gap = min(LINE * unit, (ceiling - floor) / max(len(names) - 1, 1))
    for name, y in zip(names, spread(wanted, gap, floor, ceiling), strict=True):
        start = (face + way * (REACH - 1.3) * unit, y)
        at = (start[0] + way * 0.8 * unit, y)
        over = way > 0.0 and name.target[0] > at[0] and name.target[1] > y
        if over:  # a bar over the name, in the flange: from the top of the text
            start = (at[0] + 1.5 * unit, y + (TEXT_SIZE / 2 + 0.5) * unit)
        shapes.append(Arrow(start, name.target, "text", THIN, 1.3))
        shapes.append(Text(at, name.runs, "text", anchor="end" if way < 0.0 else "start"))
    return shapes


def _heights(shape: SectionShape, shown: Shown, count: int, way: float) -> tuple[float, float]:
    """Return between which heights so many names stand beside the web [mm].

    A web that is too shallow for its names has them under the soffit as well: at the left all of
    them, past the text of the cover, at the right those that find no room beside it.
    """
    unit = 1.0 / shown.scale
    flanged = shape.kind == "T" or (shape.kind == "L" and way > 0.0)
    ceiling = shape.h - (shape.h_f + 3.5 * unit if flanged else 1.5 * unit)
    floor = 6.8 * unit if way < 0.0 else 2.0 * unit
    gaps = max(count - 1, 0)
    if ceiling - floor >= gaps * CLOSEST * unit:
        return floor, ceiling
    if way < 0.0:
        ceiling = -UNDER * unit
    return ceiling - gaps * LINE * unit, ceiling


def _rank(shape: SectionShape, name: Named, way: float) -> float:
    """Tell names of one height apart, so that their arrows do not cross [mm].

    Bars of the flange stand above, then the higher bars, then of bars in a row over their names
    those nearest the names, of bars in a row under them those farthest.
    """
    x, y = name.target
    near = way * x / shape.b_w
    over = near if y > shape.h / 2 else -near
    return 1e-3 * (y / shape.h + (1.0 if x > shape.b_w else 0.0)) + 1e-6 * over


def _dimensions(
    shape: SectionShape,
    shown: Shown,
    steel: Steel,
    first: float,
    tension: Face,
    circles: Sequence[Circle],
) -> list[Shape]:
    b, h = shape.b_w, shape.h
    x0, x1 = -shown.left, b + shown.right
    right = first - shown.right * shown.scale
    shapes: list[Shape] = [
        Dimension((x1, h), (b, 0.0), "vertical", right + NEXT, symbol("h")),
        Dimension((0.0, 0.0), (b, 0.0), "horizontal", -6.5, symbol("b", "w")),
        Dimension((0.0, 0.0), (steel.cover, steel.cover), "vertical", -4.5, words("cover")),
    ]
    depth = steel.effective_depth(tension)
    if depth is not None:
        edge = max(circle.centre[0] + circle.radius for circle in circles)
        ends = ((x1, h), (edge, h - depth)) if tension == "bottom" else ((x1, 0.0), (edge, depth))
        shapes.insert(0, Dimension(*ends, "vertical", right, symbol("d")))
    if shape.kind != "rectangle":
        value = f"{shape.b_f:.0f}" if shown.shortened else ""
        end, offset = (x1, right + 2 * NEXT) if shape.kind == "L" else (x0, -FLANGE_OFFSET)
        shapes += [
            Dimension((x0, h), (x1, h), "horizontal", 5.5, symbol("b", "f"), value),
            Dimension((end, h - shape.h_f), (end, h), "vertical", offset, symbol("h", "f")),
        ]
    return shapes


def _alt(name: str, x: float, shape: SectionShape, steel: Steel) -> str:
    kind = {"rectangle": "rectangular section", "T": "T section", "L": "L section"}[shape.kind]
    parts = [f"{name} at {x:.0f} mm: {kind}, web {shape.b_w:.0f} mm, depth {shape.h:.0f} mm"]
    for face in ("bottom", "top"):
        runs = [
            f"{run.mark} {run.number}-{run.size} layer {run.layer}".strip()
            + (f" ({run.place})" if run.place != "web" else "")
            for run in steel.runs
            if run.face == face
        ]
        parts.append(f"{face} bars {', '.join(runs) if runs else 'none'}")
    if steel.zone is not None:
        form = "closed" if steel.zone.closed else "open"
        parts.append(
            f"{form} stirrups {steel.zone.size} at {steel.zone.spacing:.0f} mm, "
            f"{steel.zone.legs} legs"
        )
    return "; ".join(parts) + "."
