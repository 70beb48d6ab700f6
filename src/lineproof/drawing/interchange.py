"""Figures as plain JSON data, and back with every value checked.

A record may come from outside, so reading takes nothing on trust: known shapes and fields only,
finite numbers, everything near the field of paper, sizes within limits.
"""

from __future__ import annotations

from dataclasses import MISSING, fields
from typing import Any

from lineproof.drawing import json_values
from lineproof.drawing.shapes import (
    Arc,
    Arrow,
    Circle,
    Dimension,
    Figure,
    Line,
    Polyline,
    Shape,
    Text,
)
from lineproof.errors import FaultList, UserError

_KINDS: dict[str, type[Shape]] = {
    "line": Line,
    "polyline": Polyline,
    "circle": Circle,
    "arc": Arc,
    "arrow": Arrow,
    "text": Text,
    "dimension": Dimension,
}
_NAMES = {kind: name for name, kind in _KINDS.items()}
_DEFAULTS = {kind: [(field.name, field.default) for field in fields(kind)] for kind in _NAMES}
_FIGURE_FIELDS = ("width", "height", "scale", "origin", "shapes", "alt", "caption")
MAX_SHAPES = 4000
MAX_POINTS = 40_000
MAX_HATCHED_CORNERS = 400
MAX_FAULTS = 20
FIELD_MARGIN = 60.0


def to_json(figure: Figure) -> dict[str, Any]:
    """Return the figure as plain JSON data: fields that have their usual value are left out.

    Numbers are rounded to ten digits, so that two processors write the same text.
    """
    return {
        "width": _plain(figure.width),
        "height": _plain(figure.height),
        "scale": _plain(figure.scale),
        "origin": _plain(figure.origin),
        "alt": figure.alt,
        "caption": figure.caption,
        "shapes": [_shape_json(shape) for shape in figure.shapes],
    }


def _shape_json(shape: Shape) -> dict[str, Any]:
    data: dict[str, Any] = {"shape": _NAMES[type(shape)]}
    for name, default in _DEFAULTS[type(shape)]:
        value = getattr(shape, name)
        if value != default:
            data[name] = _plain(value)
    return data


def _plain(value: object) -> object:
    if value.__class__ is float:  # most of them
        return float(f"{value:.10g}") + 0.0
    if isinstance(value, (int, float)) and not isinstance(value, bool):
        return float(f"{value:.10g}") + 0.0  # no negative zero
    if isinstance(value, tuple):
        return [_plain(item) for item in value]
    return value


def from_json(data: object) -> Figure:
    """Read a figure from plain JSON data.

    Raises :class:`lineproof.errors.UserError` with every fault found (the first twenty).
    """
    if not isinstance(data, dict):
        raise UserError("figure: must be an object with width, height, scale, origin and shapes")
    faults = FaultList()
    unknown = sorted(str(key)[:40] for key in data if key not in _FIGURE_FIELDS)
    if unknown:
        faults.add(f"figure: unknown field {unknown[0]!r}")
    values: dict[str, Any] = {}
    for name in ("width", "height", "scale", "origin", "alt", "caption"):
        default = "" if name == "caption" else None
        values[name] = _value(f"figure: {name}", name, data.get(name, default), faults)
    shapes = _shapes(data.get("shapes"), faults)
    faults.raise_if_any()
    figure = Figure(shapes=tuple(shapes), **values)
    _check_size(figure, faults)
    faults.raise_if_any()
    return figure


def _value(place: str, name: str, value: object, faults: FaultList) -> Any:
    try:
        return json_values.BY_FIELD[name](value)
    except json_values.FaultError as error:
        faults.add(f"{place} {error}")
        return None


def _shapes(data: object, faults: FaultList) -> list[Shape]:
    if not isinstance(data, list) or len(data) > MAX_SHAPES:
        faults.add(f"figure: shapes must be a list of at most {MAX_SHAPES} shapes")
        return []
    shapes: list[Shape] = []
    for number, item in enumerate(data, 1):
        shape = _shape(f"figure: shape {number}", item, faults)
        if shape is not None:
            shapes.append(shape)
        if len(faults.faults) >= MAX_FAULTS:
            break
    return shapes


def _shape(place: str, data: object, faults: FaultList) -> Shape | None:
    kind = data.get("shape") if isinstance(data, dict) else None
    if not isinstance(data, dict) or not isinstance(kind, str) or kind not in _KINDS:
        faults.add(f"{place} must be an object whose 'shape' is one of: {', '.join(_KINDS)}")
        return None
    before = len(faults.faults)
    known = {field.name: field for field in fields(_KINDS[kind])}
    for key in data:
        if key not in known and key != "shape":
            faults.add(f"{place} ({kind}): unknown field {str(key)[:40]!r}")
    values = {
        name: _value(f"{place} ({kind}): {name}", name, data.get(name), faults)
        for name, field in known.items()
        if name in data or field.default is MISSING
    }
    return None if len(faults.faults) > before else _KINDS[kind](**values)


def _check_size(figure: Figure, faults: FaultList) -> None:
    """Keep the drawing near its paper and its hatch countable."""
    points = [point for shape in figure.shapes for point in json_values.points_of(shape)]
    if len(points) > MAX_POINTS:
        faults.add(f"figure: {len(points)} points; at most {MAX_POINTS} can be drawn")
        return
    corners = sum(
        len(shape.points)
        for shape in figure.shapes
        if isinstance(shape, Polyline) and shape.fill == "hatch"
    )
    if corners > MAX_HATCHED_CORNERS:  # each may cost hundreds of lines
        faults.add(f"figure: hatch with {corners} corners; at most {MAX_HATCHED_CORNERS}")
    for point in points:
        x, y = figure.paper(point)
        if not (
            -FIELD_MARGIN <= x <= figure.width + FIELD_MARGIN
            and -FIELD_MARGIN <= y <= figure.height + FIELD_MARGIN
        ):
            faults.add(f"figure: point {point} lies far outside the field of paper")
            return
