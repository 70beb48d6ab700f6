"""A bent bar as lines and arcs: straight parts with left turns between, from a starting point."""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass

from lineproof.drawing import Arc, Line, Point, Shape
from lineproof.drawing.shapes import Layer


@dataclass(frozen=True, slots=True)
class Part:
    """A straight part or a bend as drawn: its middle and the direction there, degrees."""

    middle: Point
    heading: float
    end: Point


@dataclass(frozen=True, slots=True)
class Drawn:
    """The shapes of a chain, and where its straight parts and bends lie."""

    shapes: tuple[Shape, ...]
    straights: tuple[Part, ...]
    bends: tuple[Part, ...]


def ahead(point: Point, heading: float, length: float) -> Point:
    """Return the point ``length`` from a point in a direction in degrees."""
    angle = math.radians(heading)
    return point[0] + length * math.cos(angle), point[1] + length * math.sin(angle)


def chain(
    start: Point,
    heading: float,
    straights: Sequence[float],
    bends: Sequence[float],
    radius: float,
    layer: Layer,
    weight: float,
) -> Drawn:
    """Draw a chain of straight parts with left turns (degrees) of one radius between them."""
    shapes: list[Shape] = []
    straight_parts: list[Part] = []
    bend_parts: list[Part] = []
    at = start
    for number, length in enumerate(straights):
        end = ahead(at, heading, length)
        shapes.append(Line(at, end, layer, weight))
        straight_parts.append(Part(ahead(at, heading, length / 2), heading, end))
        at = end
        if number == len(bends):
            break
        turn = bends[number]
        centre = ahead(at, heading + 90.0, radius)
        shapes.append(
            Arc(centre, radius, *_angles(heading - 90.0, heading - 90.0 + turn), layer, weight)
        )
        middle = ahead(centre, heading - 90.0 + turn / 2, radius)
        at = ahead(centre, heading - 90.0 + turn, radius)
        bend_parts.append(Part(middle, heading + turn / 2, at))
        heading += turn
    return Drawn(tuple(shapes), tuple(straight_parts), tuple(bend_parts))


def _angles(start: float, end: float) -> tuple[float, float]:
    """Angles within one turn, the end after the start."""
    turns = math.floor(start / 360.0)
    return start - 360.0 * turns, end - 360.0 * turns


def outlines(
    start: Point,
    heading: float,
    straights: Sequence[float],
    bends: Sequence[float],
    radius: float,
    diameter: float,
    layer: Layer,
    weight: float,
) -> tuple[Shape, ...]:
    """Draw both edges of a bar whose centre line starts at ``start``; inside radius ``radius``."""
    shapes: list[Shape] = []
    for side, edge in ((diameter / 2, radius), (-diameter / 2, radius + diameter)):
        begin = ahead(start, heading + 90.0, side)
        shapes.extend(chain(begin, heading, straights, bends, edge, layer, weight).shapes)
    return tuple(shapes)
