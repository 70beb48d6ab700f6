"""Plain shapes of a drawing and the figure that holds them.

Positions, radii and lengths are in drawing units (mm of the member unless a figure says
otherwise), y up. Text sizes, line weights, offsets of dimensions and arrow heads are in mm on
paper.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal

Point = tuple[float, float]
Style = Literal["roman", "italic", "bold", "sub", "sup"]
Runs = tuple[tuple[str, Style], ...]
Layer = Literal[
    "concrete", "bars", "stirrups", "dimensions", "text", "centre", "loads", "axes", "curve"
]
Dash = Literal["solid", "dashed", "long", "dotted", "chain"]
Fill = Literal["none", "black", "white", "hatch"]

OUTLINE = 0.5
MEDIUM = 0.3
LIGHT = 0.2
THIN = 0.13
TEXT_SIZE = 2.8


@dataclass(frozen=True, slots=True)
class Line:
    """A straight line."""

    start: Point
    end: Point
    layer: Layer = "concrete"
    weight: float = OUTLINE
    dash: Dash = "solid"


@dataclass(frozen=True, slots=True)
class Polyline:
    """Straight lines through ``points``; a closed one may be filled (weight 0: no outline)."""

    points: tuple[Point, ...]
    layer: Layer = "concrete"
    weight: float = OUTLINE
    dash: Dash = "solid"
    closed: bool = False
    fill: Fill = "none"


@dataclass(frozen=True, slots=True)
class Circle:
    """A circle, open or solid."""

    centre: Point
    radius: float
    layer: Layer = "bars"
    weight: float = 0.0
    fill: Fill = "black"


@dataclass(frozen=True, slots=True)
class Arc:
    """A circular arc, anticlockwise from ``start_angle`` to ``end_angle`` in degrees."""

    centre: Point
    radius: float
    start_angle: float
    end_angle: float
    layer: Layer = "concrete"
    weight: float = OUTLINE
    dash: Dash = "solid"


@dataclass(frozen=True, slots=True)
class Arrow:
    """A line with a solid head at ``end``; ``head`` is its length in mm on paper."""

    start: Point
    end: Point
    layer: Layer = "loads"
    weight: float = LIGHT
    head: float = 1.8


@dataclass(frozen=True, slots=True)
class Text:
    """One line of text made of styled runs.

    ``backing`` lays a white field under the text; ``rotation`` is in degrees, anticlockwise.
    """

    at: Point
    runs: Runs
    layer: Layer = "text"
    size: float = TEXT_SIZE
    anchor: Literal["start", "middle", "end"] = "middle"
    valign: Literal["baseline", "middle"] = "middle"
    rotation: float = 0.0
    backing: bool = True


@dataclass(frozen=True, slots=True)
class Dimension:
    """A dimension line between two points, measured along ``direction``.

    ``offset`` is the distance in mm on paper from ``start`` to the dimension line: upwards for a
    horizontal dimension, to the right for a vertical one (negative: the other way).
    The text is ``symbol = value`` (``cover 40`` for plain words); an empty ``value`` prints the
    measured length in whole units. A text that does not fit between the ticks moves past the
    ``outside`` end of a horizontal dimension, or beside a vertical one.
    ``value`` is given only where the drawing is deliberately not to scale.
    """

    start: Point
    end: Point
    direction: Literal["horizontal", "vertical"]
    offset: float
    symbol: Runs = ()
    value: str = ""
    layer: Layer = "dimensions"
    size: float = TEXT_SIZE
    outside: Literal["start", "end"] = "end"

    @property
    def measured(self) -> float:
        """The length in drawing units."""
        axis = 0 if self.direction == "horizontal" else 1
        return abs(self.end[axis] - self.start[axis])

    @property
    def runs(self) -> Runs:
        """The text as printed."""
        value = self.value or f"{self.measured:.0f}"
        worded = all(style == "roman" for _, style in self.symbol)
        link = "" if not self.symbol else " " if worded else " = "
        return (*self.symbol, (f"{link}{value}", "roman"))


Shape = Line | Polyline | Circle | Arc | Arrow | Text | Dimension


@dataclass(frozen=True, slots=True)
class Figure:
    """A drawing on a field of paper.

    ``width`` and ``height`` in mm on paper; ``scale`` in mm of paper per drawing unit (0.1 is
    1 to 10); ``origin`` is the place of the drawing's (0, 0) in mm from the lower left corner.
    ``alt`` tells a reader who cannot see the figure what it shows.
    """

    width: float
    height: float
    scale: float
    origin: Point
    shapes: tuple[Shape, ...]
    alt: str
    caption: str = ""

    def paper(self, point: Point) -> Point:
        """Place of a drawing point on paper, mm from the lower left corner."""
        return (
            self.origin[0] + self.scale * point[0],
            self.origin[1] + self.scale * point[1],
        )


def symbol(base: str, sub: str = "", sup: str = "") -> Runs:
    """Return the runs of a symbol as the trade prints it: italic letter, upright marks.

    >>> symbol("A", "s")
    (('A', 'italic'), ('s', 'sub'))
    """
    if base.endswith("f") and sup:
        sup = f"\u2009{sup}"  # the hook of an italic f would touch the prime
    parts: list[tuple[str, Style]] = [(base, "italic"), (sup, "roman"), (sub, "sub")]
    return tuple((text, style) for text, style in parts if text)


def words(text: str) -> Runs:
    """Return plain upright words as runs."""
    return ((text, "roman"),)
