"""What each field of a figure's plain data may hold."""

from __future__ import annotations

import unicodedata
from collections.abc import Callable, Sequence
from typing import TypeGuard, get_args

from lineproof.drawing.shapes import (
    Arc,
    Circle,
    Dash,
    Dimension,
    Fill,
    Layer,
    Point,
    Polyline,
    Runs,
    Shape,
    Style,
    Text,
)

MAX_TEXT = 400
MAX_ALT = 4000
MAX_RUNS = 40
MAX_COORDINATE = 1e7
FEWEST_POINTS = 2
MAX_POINTS = 10_000


class FaultError(ValueError):
    """A value that cannot stand in its field; the message completes 'width must be ...'."""


def _number(low: float, high: float) -> Callable[[object], float]:
    def check(value: object) -> float:
        # the comparison also refuses nan, and an int too long for a float
        if isinstance(value, (int, float)) and not isinstance(value, bool) and low <= value <= high:
            return float(value)
        msg = f"must be a number from {low:g} to {high:g}"
        raise FaultError(msg)

    return check


def _one_of(choices: tuple[str, ...]) -> Callable[[object], str]:
    def check(value: object) -> str:
        if isinstance(value, str) and value in choices:
            return value
        msg = f"must be one of: {', '.join(choices)}"
        raise FaultError(msg)

    return check


def _text(longest: int, shortest: int = 0) -> Callable[[object], str]:
    def check(value: object) -> str:
        if (
            isinstance(value, str)
            and shortest <= len(value.strip() if shortest else value) <= longest
            and not any(unicodedata.category(c) in {"Cc", "Cs"} for c in value)
        ):
            return value
        msg = f"must be text of {shortest} to {longest} characters without control characters"
        raise FaultError(msg)

    return check


def _true_or_false(value: object) -> bool:
    if isinstance(value, bool):
        return value
    msg = "must be true or false"
    raise FaultError(msg)


_coordinate = _number(-MAX_COORDINATE, MAX_COORDINATE)
_run_text = _text(MAX_TEXT)
_run_style = _one_of(get_args(Style))


def _is_pair(value: object) -> TypeGuard[Sequence[object]]:
    pair = 2
    return isinstance(value, (list, tuple)) and len(value) == pair


def _point(value: object) -> Point:
    if _is_pair(value):
        return (_coordinate(value[0]), _coordinate(value[1]))
    msg = "must be two numbers [x, y]"
    raise FaultError(msg)


def _points(value: object) -> tuple[Point, ...]:
    if isinstance(value, (list, tuple)) and FEWEST_POINTS <= len(value) <= MAX_POINTS:
        return tuple(_point(point) for point in value)
    msg = f"must be a list of {FEWEST_POINTS} to {MAX_POINTS} points"
    raise FaultError(msg)


def _runs(value: object) -> Runs:
    if not isinstance(value, (list, tuple)) or len(value) > MAX_RUNS:
        msg = f"must be a list of at most {MAX_RUNS} pairs [text, style]"
        raise FaultError(msg)
    runs = []
    for item in value:
        if not _is_pair(item):
            msg = "must hold pairs [text, style]"
            raise FaultError(msg)
        runs.append((_run_text(item[0]), _run_style(item[1])))
    return tuple(runs)  # type: ignore[arg-type]


BY_FIELD: dict[str, Callable[[object], object]] = {
    "width": _number(1.0, 400.0),
    "height": _number(1.0, 400.0),
    "scale": _number(1e-6, 1e4),
    "origin": _point,
    "alt": _text(MAX_ALT, shortest=1),
    "caption": _text(MAX_TEXT),
    "start": _point,
    "end": _point,
    "at": _point,
    "centre": _point,
    "points": _points,
    "radius": _number(0.0, MAX_COORDINATE),
    "start_angle": _number(-720.0, 720.0),
    "end_angle": _number(-720.0, 720.0),
    "layer": _one_of(get_args(Layer)),
    "weight": _number(0.0, 5.0),
    "dash": _one_of(get_args(Dash)),
    "fill": _one_of(get_args(Fill)),
    "closed": _true_or_false,
    "backing": _true_or_false,
    "head": _number(0.0, 10.0),
    "runs": _runs,
    "symbol": _runs,
    "size": _number(1.0, 10.0),
    "anchor": _one_of(("start", "middle", "end")),
    "valign": _one_of(("baseline", "middle")),
    "rotation": _number(-360.0, 360.0),
    "outside": _one_of(("start", "end")),
    "direction": _one_of(("horizontal", "vertical")),
    "offset": _number(-200.0, 200.0),
    "value": _text(MAX_TEXT),
}


def points_of(shape: Shape) -> tuple[Point, ...]:
    """Return the points that must lie near the field of paper."""
    match shape:
        case Polyline():
            return shape.points
        case Circle() | Arc():
            (x, y), radius = shape.centre, shape.radius
            return ((x - radius, y - radius), (x + radius, y + radius))
        case Text():
            return (shape.at,)
        case Dimension():
            return (shape.start, shape.end)
        case _:
            return (shape.start, shape.end)
