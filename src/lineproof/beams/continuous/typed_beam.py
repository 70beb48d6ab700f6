"""Spans, supports, columns and single loads as the designer types them, checked at the border."""

from __future__ import annotations

import re
from collections.abc import Callable, Mapping, Sequence
from dataclasses import dataclass
from typing import Any, Literal

from lineproof.beams.analysis.arrangements import LOAD_TYPES
from lineproof.beams.analysis.model import FarEnd, SupportKind
from lineproof.beams.continuous.layout import BeamOutline, BuiltSupport, Carrier
from lineproof.beams.inputs import Range, bare_number, read_in_range
from lineproof.errors import FaultList, UserError
from lineproof.quantity import QuantityInput, Typed, echo

CARRIERS: tuple[Carrier, ...] = ("column", "girder", "wall")
MOST_SPANS = 24
SPAN = Range("m", 0.5, 40, 8)
DEPTH = Range("mm", 150, 3000, 600)
WIDTH = Range("mm", 50, 3000, 400)
COLUMN_SIZE = Range("mm", 150, 3000, 450)
COLUMN_HEIGHT = Range("m", 0.5, 20, 3.6)
PLACE = Range("m", 0, 40, 2.5, zero=True)
LOADED_WIDTH = Range("m", 0.01, 40, 1.5)
LINE_LOAD = Range("kN/m", 0, 2000, 6, zero=True)
AREA_LOAD = Range("kPa", 0, 500, 2.4, zero=True)
POINT_LOAD = Range("kN", 0, 20000, 50, zero=True)
GRAVITY_TYPES = tuple(kind for kind in LOAD_TYPES if kind not in ("W", "E"))
_SUPPORT = re.compile(r"\s*(column|girder|wall)\s+([^,]+?)\s*(,\s*fixed)?\s*\Z")
_MORE = re.compile(r"[^ ] [x×] [^ ]|[a-z\"'] (?:fixed|pinned|free|simple)")
"""More than a width: two sizes, or how it holds without the comma."""
_COLUMN = re.compile(r"\s*(.+?)\s+[x×]\s+(.+?)\s+[x×]\s+(.+?)\s*(,\s*pinned)?\s*\Z")
_SUPPORT_SAMPLE = "'column 450 mm', 'girder 400 mm', 'wall 300 mm, fixed' or 'free'"
_COLUMN_SAMPLE = "'450 mm x 450 mm x 3.6 m' (along the beam, across it, height)"


@dataclass(frozen=True, slots=True)
class TypedColumn:
    """A column above or below a support: depth along the beam, width across it, height."""

    depth: Typed
    width: Typed
    height: Typed
    far_end: FarEnd


@dataclass(frozen=True, slots=True)
class TypedSupport:
    """A support: what it is, its width along the beam (None at a free end), how it holds."""

    carrier: Carrier
    width: Typed | None
    kind: SupportKind
    columns: tuple[TypedColumn, ...] = ()


Form = Literal["line", "area", "point"]


@dataclass(frozen=True, slots=True)
class TypedLoad:
    """A load beside the floor: its type and size, where it acts, and what it is.

    ``start`` and ``end`` stand for a load over part of a span, ``at`` for a point load; all from
    the left axis of the span. ``spans`` are numbers from 1.
    """

    kind: str
    spans: tuple[int, ...]
    form: Form
    size: Typed
    what: str
    width: Typed | None = None
    start: Typed | None = None
    end: Typed | None = None
    at: Typed | None = None


def read_list(name: str, given: object) -> list[Any]:
    """Return a list as a list; raises :class:`UserError`."""
    if isinstance(given, list | tuple):
        return list(given)
    raise UserError(f"{name}: {echo(given)} is not a list; write it in brackets: [..., ...]")


def read_spans(name: str, given: object) -> tuple[Typed, ...]:
    """Read the spans, centre to centre of supports; raises :class:`UserError` with all faults."""
    rows = read_list(name, given)
    faults = FaultList()
    if not 1 <= len(rows) <= MOST_SPANS:
        faults.add(f"{name}: {len(rows)} spans; write 1 to {MOST_SPANS}")
    read = [_try(faults, read_in_range, f"{name}, span {n}", row, SPAN) for n, row in _count(rows)]
    faults.raise_if_any()
    return tuple(read)


def spans_counted(given: object) -> int:
    """Return how many spans are typed, whatever their lengths; 0 where that cannot be told."""
    return len(given) if isinstance(given, list | tuple) and len(given) <= MOST_SPANS else 0


def read_depths(name: str, given: object, spans: int) -> tuple[Typed, ...]:
    """Read one overall depth for all spans, or one a span."""
    if not isinstance(given, list | tuple):
        return (read_in_range(name, given, DEPTH),) * spans  # type: ignore[arg-type]  # refused there
    faults = FaultList()
    if len(given) != spans:
        faults.add(f"{name}: {len(given)} depths for {spans} spans; write one, or one a span")
    read = [
        _try(faults, read_in_range, f"{name}, span {n}", row, DEPTH) for n, row in _count(given)
    ]
    faults.raise_if_any()
    return tuple(read)


def read_supports(
    name: str, given: object, columns: object, spans: int
) -> tuple[TypedSupport, ...]:
    """Read the supports from left to right with the columns that hold them elastically."""
    rows = read_list(name, given)
    faults = FaultList()
    if len(rows) != spans + 1:
        faults.add(
            f"{name}: {len(rows)} supports for {spans} spans; write {spans + 1}, with 'free' at "
            "the end of a cantilever"
        )
    held = _read_columns(columns, len(rows), faults)
    made = [_try(faults, _read_support, f"{name}, support {n}", row, held.get(n, ()))
            for n, row in _count(rows)]  # fmt: skip
    faults.raise_if_any()
    return tuple(made)


def _read_support(name: str, given: object, columns: tuple[TypedColumn, ...]) -> TypedSupport:
    if given == "free":
        if columns:
            raise UserError(f"{name}: a free end has no columns; leave them out")
        return TypedSupport("none", None, "free")
    match = _SUPPORT.match(str(given))
    if match is None or _MORE.search(match[2]):
        raise UserError(f"{name}: {echo(given)} is not understood; write {_SUPPORT_SAMPLE}")
    carrier = next(c for c in CARRIERS if c == match[1])
    if columns and (match[3] or carrier != "column"):
        raise UserError(
            f"{name}: {echo(given)} has columns given for it; write 'column {match[2]}', or leave "
            "the columns out"
        )
    width = read_in_range(name, match[2], WIDTH)
    for column in columns:
        if column is not None and width.value != column.depth.value:
            raise UserError(
                f"{name}: {echo(given)} has columns of {column.depth.text} along the beam; write "
                f"'column {column.depth.text}', or columns of {width.text}"
            )
    kind: SupportKind = "elastic" if columns else "fixed" if match[3] else "simple"
    return TypedSupport(carrier, width, kind, columns)


def _read_columns(
    given: object, supports: int, faults: FaultList
) -> dict[int, tuple[TypedColumn, ...]]:
    if given is None:
        return {}
    if not isinstance(given, Mapping):
        faults.add(
            f"columns: {echo(given)} is not understood; write the columns by number of the "
            f"support: {{2: [{_COLUMN_SAMPLE.partition(' (')[0]}]}}"
        )
        return {}
    made: dict[int, tuple[TypedColumn, ...]] = {}
    for number, texts in given.items():
        name = f"columns, support {number if type(number) is int else echo(number)}"
        if type(number) is not int or not 1 <= number <= supports:
            told = bare_number(number)
            told = f"write {told}" if told else f"the beam has supports 1 to {supports}"
            faults.add(f"{name}: {told}")
            continue
        if not isinstance(texts, str | list | tuple):
            faults.add(f"{name}: {echo(texts)} is not understood; write {_COLUMN_SAMPLE}")
            continue
        rows = [texts] if isinstance(texts, str) else list(texts)
        if not 1 <= len(rows) <= 2:  # noqa: PLR2004 - one below, one above
            faults.add(f"{name}: {len(rows)} columns; write one or two, below and above")
            continue
        read = [_try(faults, _read_column, name, text) for text in rows]
        made[number] = tuple(read)
    return made


_COLUMN_SIDES = (
    ("along the beam", COLUMN_SIZE), ("across it", COLUMN_SIZE), ("height", COLUMN_HEIGHT),
)  # fmt: skip


def _read_column(name: str, given: object) -> TypedColumn:
    match = _COLUMN.match(str(given))
    if match is None:
        raise UserError(f"{name}: {echo(given)} is not understood; write {_COLUMN_SAMPLE}")
    faults = FaultList()
    read = [
        _try(faults, read_in_range, f"{name}, {which}", match[n], limits)
        for n, (which, limits) in enumerate(_COLUMN_SIDES, start=1)
    ]
    faults.raise_if_any()
    along, across, height = read
    return TypedColumn(along, across, height, "pinned" if match[4] else "fixed")


_KEYS = {"type", "span", "line", "area", "point", "width", "from", "to", "at", "what"}
_BY_HAND = ", and calculate what wind or earthquake does to the beam by hand"
_FORMS: Mapping[Form, Range] = {"line": LINE_LOAD, "area": AREA_LOAD, "point": POINT_LOAD}
_LOAD_SAMPLE = (
    "{'type': 'L', 'span': 2, 'point': '40 kN', 'at': '3.1 m', 'what': 'reaction of beam B12'}"
)


def read_loads(name: str, given: object, spans: Sequence[Typed]) -> tuple[TypedLoad, ...]:
    """Read single loads; raises :class:`UserError` with every fault of every load."""
    faults = FaultList()
    made: list[TypedLoad] = []
    for number, row in _count(read_list(name, given or [])):
        read = _try(faults, _read_load, f"{name}, load {number}", row, spans)
        if read is not None:
            made.append(read)
    faults.raise_if_any()
    return tuple(made)


def _read_load(name: str, given: object, lengths: Sequence[Typed]) -> TypedLoad:
    if not isinstance(given, Mapping) or not all(isinstance(key, str) for key in given):
        raise UserError(f"{name}: {echo(given)} is not understood; write {_LOAD_SAMPLE}")
    unknown = sorted(set(given) - _KEYS)
    forms = [form for form in _FORMS if form in given]
    faults = FaultList()
    if unknown:
        faults.add(f"{name}: {echo(unknown[0])} is not known; there are {', '.join(sorted(_KEYS))}")
    if len(forms) != 1:
        faults.add(f"{name}: write one of 'line', 'area' or 'point', as in {_LOAD_SAMPLE}")
    if given.get("type") not in GRAVITY_TYPES:
        faults.add(
            f"{name}: type {echo(given.get('type'))}; write one of {', '.join(GRAVITY_TYPES)}"
            f"{_BY_HAND if given.get('type') in LOAD_TYPES else ''}"
        )
    spans = _try(faults, _span_numbers, name, given.get("span"), len(lengths)) or ()
    if len(forms) != 1:
        faults.raise_if_any()
    form = forms[0]
    size = _try(faults, _read_size, f"{name}, {form}", given[form], _FORMS[form])
    width = _part(faults, name, given, "width", LOADED_WIDTH, needed=form == "area")
    ends = {key: _part(faults, name, given, key, PLACE, needed="from" in given or "to" in given)
            for key in ("from", "to")}  # fmt: skip
    at = _part(faults, name, given, "at", PLACE, needed=form == "point")
    if form == "point" and ("from" in given or "to" in given):
        faults.add(f"{name}: a point load acts at one place; leave out 'from' and 'to'")
    _inside(faults, name, spans, lengths, ends | {"at": at})
    faults.raise_if_any()
    return TypedLoad(
        str(given["type"]), spans, form, size, str(given.get("what", "")).strip() or "load given",
        width, ends["from"], ends["to"], at,
    )  # fmt: skip


def _read_size(name: str, given: QuantityInput, allowed: Range) -> Typed:
    """Read the size of a load, which acts downward: one typed with a minus is meant to lift."""
    if isinstance(given, str) and given.strip().startswith(("-", "\u2212")):
        read_in_range(name, given.strip()[1:].strip(), allowed)
        raise UserError(
            f"{name}: {echo(given)} would lift the beam, and loads act downward here; leave the "
            f"load out{_BY_HAND}"
        )
    return read_in_range(name, given, allowed)


def _part(
    faults: FaultList,
    name: str,
    given: Mapping[str, Any],
    key: str,
    allowed: Range,
    *,
    needed: bool,
) -> Typed | None:
    if needed and key not in given:
        faults.add(f"{name}: {key!r} is missing; write for example '{key}': '1.2 m'")
        return None
    if key not in given:
        return None
    if not needed:
        faults.add(f"{name}: {key!r} has no meaning here; leave it out")
        return None
    made: Typed | None = _try(faults, read_in_range, f"{name}, {key}", given[key], allowed)
    return made


def _span_numbers(name: str, given: object, count: int) -> tuple[int, ...]:
    if given == "all":
        return tuple(range(1, count + 1))
    if isinstance(given, int) and not isinstance(given, bool) and 1 <= given <= count:
        return (given,)
    told = bare_number(given) or f"1 to {count}, or 'all'"
    raise UserError(f"{name}: span {echo(given)}; write {told}")


def _inside(
    faults: FaultList,
    name: str,
    spans: Sequence[int],
    lengths: Sequence[Typed],
    places: Mapping[str, Typed | None],
) -> None:
    for span in spans:
        length = lengths[span - 1]
        for key, place in places.items():
            if place is not None and place.value > length.value:
                faults.add(
                    f"{name}: {key} {place.text} lies outside span {span} of {length.text}; write "
                    "a distance from the left axis of the span"
                )
    start, end = places["from"], places["to"]
    if start is not None and end is not None and start.value >= end.value:
        faults.add(f"{name}: from {start.text} to {end.text}; write from < to")


def _count(rows: Sequence[Any]) -> list[tuple[int, Any]]:
    return list(enumerate(rows, start=1))


def _try(faults: FaultList, read: Callable[..., Any], *args: Any) -> Any:
    """Read something; note its faults and go on."""
    try:
        return read(*args)
    except UserError as error:
        faults.take(error)
        return None


def outline_of_typed(
    fields: Mapping[str, Any], widths: Sequence[float] | None = None
) -> BeamOutline | None:
    """Return the concrete of the beam as typed [mm], None as long as some of it is not known.

    ``widths`` are those of the flange by span; without them that of the web.
    """
    needed = ("shape", "spans", "depths", "supports", "b_w", "cover")
    if not all(fields.get(name) for name in needed):
        return None
    lengths, h_f = fields["spans"], fields["h_f"]
    return BeamOutline(
        fields["shape"],
        tuple(length.value for length in lengths),
        tuple(depth.value for depth in fields["depths"]),
        tuple(widths or (fields["b_w"].value,) * len(lengths)),
        tuple(
            BuiltSupport(0.0 if s.width is None else s.width.value, s.kind, s.carrier)
            for s in fields["supports"]
        ),
        fields["b_w"].value,
        0.0 if h_f is None else h_f.value,
        fields["cover"].value,
    )
