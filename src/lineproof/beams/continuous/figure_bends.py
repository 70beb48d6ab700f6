"""Bending shapes of a schedule: one drawing a mark with its legs, in a grid."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, replace

from lineproof.beams.continuous.bending import BentShape
from lineproof.beams.continuous.figure_chain import Drawn, Part, ahead, chain
from lineproof.beams.continuous.schedule import BarItem
from lineproof.drawing import OUTLINE, Arc, Figure, Line, Point, Runs, Shape, Text, words
from lineproof.drawing.metrics import PAGE_WIDTH
from lineproof.drawing.shapes import Layer

COLUMNS = 3
NAME, LEG = 2.6, 2.4
RADIUS = 1.3
MAIN, HOOK, TAIL, STIRRUP_HOOK = 26.0, 5.0, 3.6, 4.2
HEIGHT, NARROWEST, WIDEST = 14.0, 17.0, 24.0
TITLE, GAP, NOTE_HEIGHT = 5.0, 3.5, 6.0
TALLEST = 220.0
CAPTION = "Bending shapes"


@dataclass(frozen=True, slots=True)
class Cell:
    """One shape, drawn with its lower left corner at the origin: shapes and height [mm]."""

    shapes: tuple[Shape, ...]
    height: float


def bends_figures(items: Sequence[BarItem]) -> tuple[Figure, ...]:
    """Draw the shape of each line of a schedule with its legs in mm, not to scale.

    A long schedule takes several figures, none taller than a page has room for.
    """
    pages: list[list[BarItem]] = [[]]
    height = 0.0
    for first in range(0, len(items), COLUMNS):
        row = list(items[first : first + COLUMNS])
        more = max(_cell(item).height for item in row) + GAP
        if pages[-1] and height + more > TALLEST - NOTE_HEIGHT:
            pages.append([])
            height = 0.0
        pages[-1].extend(row)
        height += more
    return tuple(_grid(page) for page in pages if page)


def _grid(items: Sequence[BarItem]) -> Figure:
    cells = [_cell(item) for item in items]
    pitch = PAGE_WIDTH / COLUMNS
    rows = [cells[first : first + COLUMNS] for first in range(0, len(cells), COLUMNS)]
    heights = [max(cell.height for cell in row) for row in rows]
    total = sum(heights) + GAP * len(rows) + NOTE_HEIGHT
    shapes: list[Shape] = []
    top = total
    for row, height in zip(rows, heights, strict=True):
        for column, cell in enumerate(row):
            shapes.extend(_moved(cell.shapes, column * pitch + 1.5, top - cell.height))
        top -= height + GAP
    note = "Legs in mm, outside to outside, not to scale. In brackets: shape code of ISO 3766."
    shapes.append(Text((1.5, 2.0), words(note), "text", 2.6, "start"))
    return Figure(PAGE_WIDTH, round(total, 1), 1.0, (0.0, 0.0), tuple(shapes), _alt(items), CAPTION)


def _cell(item: BarItem) -> Cell:
    layer: Layer = "bars" if item.shape.form == "bar" else "stirrups"
    drawn, below, above = _drawn(item.shape, layer)
    code = f" ({item.shape.code})" if item.shape.code else ""
    text = f" {item.number}-{item.size}, cut {item.shape.cut:.0f}{code}"
    name: Runs = ((item.mark, "bold"), (text, "roman"))
    height = below + above + TITLE
    title = Text((0.0, height - 1.5), name, "text", NAME, "start")
    lines = _moved((*drawn.shapes, *_legs(item.shape, drawn)), 12.0, below)
    return Cell((title, *lines), height)


def _drawn(shape: BentShape, layer: Layer) -> tuple[Drawn, float, float]:
    """Draw a shape for the eye, and what stands below and above its lowest line [mm]."""
    if shape.form == "bar":
        return _bar(shape, layer)
    legs = dict(shape.legs)
    width = 0.0
    if shape.form in {"open stirrup", "closed stirrup"}:
        wide, high = (
            (legs["C"], legs["B"]) if shape.form == "open stirrup" else (legs["B"], legs["A"])
        )
        width = min(max(HEIGHT * wide / high, NARROWEST), WIDEST)
    side, base = HEIGHT - 2 * RADIUS, width - 2 * RADIUS
    straights: tuple[float, ...]
    match shape.form:
        case "open stirrup":
            start, heading = (RADIUS + STIRRUP_HOOK, HEIGHT), 180.0
            straights = (STIRRUP_HOOK, side, base, side, STIRRUP_HOOK)
        case "closed stirrup":
            start, heading = _closing_start(), 135.0
            straights = (TAIL, side, base, side, base, TAIL)
        case "single leg":
            start, heading = (RADIUS + STIRRUP_HOOK, HEIGHT), 180.0
            straights = (STIRRUP_HOOK, side, STIRRUP_HOOK)
        case _:
            start, heading = _closing_start(), 135.0
            straights = (TAIL, side, TAIL)
    drawn = chain(start, heading, straights, shape.bends, RADIUS, layer, OUTLINE)
    return drawn, 4.2, HEIGHT + 3.8


def _closing_start() -> Point:
    """Free end of a 135 degree hook at the upper left corner, its bend ending downward."""
    centre = (RADIUS, HEIGHT - RADIUS)
    return ahead(ahead(centre, 45.0, RADIUS), 135.0, -TAIL)


def _bar(shape: BentShape, layer: Layer) -> tuple[Drawn, float, float]:
    """Draw a bar from left to right, its hooks up."""
    tails = {90.0: HOOK, 180.0: TAIL}
    hooks = [tails[bend] for bend in shape.bends]
    if len(hooks) > 1:
        straights: tuple[float, ...] = (hooks[0], MAIN, hooks[1])
        if shape.bends[0] == 180.0:  # noqa: PLR2004 - degrees
            start, heading = (TAIL, 2 * RADIUS), 180.0
        else:
            start, heading = (-RADIUS, RADIUS + HOOK), 270.0
    else:
        straights, start, heading = (MAIN, *hooks), (0.0, 0.0), 0.0
    drawn = chain(start, heading, straights, shape.bends, RADIUS, layer, OUTLINE)
    tall = {(): 0.8, (180.0,): 2 * RADIUS + 4.4, (180.0, 180.0): 2 * RADIUS + 4.4}
    return drawn, 4.2, tall.get(shape.bends, RADIUS + HOOK + 0.8)


def _legs(shape: BentShape, drawn: Drawn) -> list[Text]:
    """Print letter and length beside each leg, on the outer side of the bend."""
    parts: list[tuple[Part, str]]
    match shape.form:
        case "closed stirrup":
            inner = _inside(drawn.straights[0])
            parts = [(drawn.straights[1], ""), (drawn.straights[2], ""), (inner, "in")]
        case "closed single leg":
            parts = [(drawn.straights[1], ""), (_inside(drawn.straights[0]), "in")]
        case _:
            parts = []
            for number, straight in enumerate(drawn.straights):
                parts.append((straight, ""))
                if number < len(shape.bends) and shape.bends[number] == 180.0:  # noqa: PLR2004
                    parts.append((drawn.bends[number], ""))
    return [
        _beside(part, words(f"{letter} {length:.0f}"), inside=bool(where))
        for (part, where), (letter, length) in zip(parts, shape.legs, strict=True)
    ]


def _inside(part: Part) -> Part:
    """Free end of a hook that points into the shape."""
    length = 2 * ((part.end[0] - part.middle[0]) ** 2 + (part.end[1] - part.middle[1]) ** 2) ** 0.5
    free = ahead(part.end, part.heading, -length - 0.9)
    return replace(part, middle=free)


def _beside(part: Part, runs: Runs, *, inside: bool) -> Text:
    x, y = part.middle
    if inside:
        return Text((x - 0.4, y - 0.7), runs, "text", LEG, "start")
    way = round(part.heading - 90.0) % 360
    if way == 0:
        return Text((x + 1.1, y), runs, "text", LEG, "start")
    if way == 180:  # noqa: PLR2004 - degrees
        return Text((x - 1.1, y), runs, "text", LEG, "end")
    up = 1.0 if way == 90 else -1.0  # noqa: PLR2004 - degrees
    return Text((x, y + up * 2.1), runs, "text", LEG)


def _moved(shapes: Sequence[Shape], dx: float, dy: float) -> tuple[Shape, ...]:
    def to(point: Point) -> Point:
        return point[0] + dx, point[1] + dy

    moved: list[Shape] = []
    for shape in shapes:
        match shape:
            case Line():
                moved.append(replace(shape, start=to(shape.start), end=to(shape.end)))
            case Arc():
                moved.append(replace(shape, centre=to(shape.centre)))
            case Text():
                moved.append(replace(shape, at=to(shape.at)))
    return tuple(moved)


def _alt(items: Sequence[BarItem]) -> str:
    listed = "; ".join(
        f"{item.mark} {item.number}-{item.size} {item.shape.words}"
        + (f", {item.shape.legs_text}" if item.shape.legs_text else "")
        + f", cut {item.shape.cut:.0f} mm"
        for item in items
    )
    text = f"Bending shapes: {listed}."
    longest = 3900
    return text if len(text) <= longest else f"{text[:longest]} ..."
