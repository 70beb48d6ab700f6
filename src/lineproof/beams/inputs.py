"""The inputs of a floor beam: read and checked at the border, all faults at once."""

from __future__ import annotations

import re
from collections.abc import Callable, Mapping
from dataclasses import dataclass
from typing import Any, Literal

from lineproof.beams.bars import BarLayers, read_bars, read_one_layer
from lineproof.errors import FaultList, UserError
from lineproof.quantity import (
    QuantityInput,
    Typed,
    echo,
    internal_factor,
    read_quantity,
    unit_named,
)
from lineproof.quantity.units import usual_units
from lineproof.sheet import LookupTable
from lineproof.standards.a23_3.bars import GRADES, STIRRUP_BENDS
from lineproof.standards.a23_3.cover import EXPOSURES, FIRE_COVER, FIRE_SLAB
from lineproof.standards.a23_3.materials import DENSITY_FACTORS, LEAST_F_C, MOST_F_C
from lineproof.standards.codes import CodePair, code_pair
from lineproof.standards.nbc.loads import USES

Shape = Literal["T", "L", "rectangular"]
SHAPES = ("T", "L", "rectangular")
OVERHANGS: Mapping[Shape, int] = {"T": 2, "L": 1, "rectangular": 0}
"""Number of overhangs of the slab by the shape of a section."""
ENDS = ("free", "cast with a girder", "cast with a column")
SNOWED_ON = ("roof", "exterior balcony")
LEAST_NORMAL = 2150.0
"""Least density of normal-density concrete [kg/m3] (from memory)."""
MINIMUM_RULES = ("10.5.1.1", "10.5.1.2")


@dataclass(frozen=True, slots=True)
class Range:
    """The unit in which an input is printed, the range the method covers, a usual value in it."""

    unit: str
    low: float
    high: float
    usual: float
    zero: bool = False


OLDER_BARS = Range("MPa", 200, 500, 300)
"""Yield strength of bars that are not of a grade of today."""
RANGES: Mapping[str, Range] = {
    "span": Range("m", 1, 40, 8),
    "spacing": Range("m", 0.3, 20, 3.1),
    "tributary_width": Range("m", 0.1, 20, 1.7),
    "b_w": Range("mm", 100, 2000, 400),
    "h": Range("mm", 150, 3000, 600),
    "h_f": Range("mm", 20, 1000, 140),
    "b_f": Range("mm", 100, 20000, 1900),
    "d": Range("mm", 60, 3000, 540),
    "f_c": Range("MPa", LEAST_F_C, MOST_F_C, 30),
    "gamma_c": Range("kg/m3", 1500, 2500, 2400),
    "superimposed": Range("kPa", 0, 100, 1.8, zero=True),
    "floor_weight": Range("kPa", 0, 100, 3.4, zero=True),
    "live_load": Range("kPa", 0.1, 100, 4.8),
    "cover": Range("mm", 10, 200, 40),
    "aggregate": Range("mm", 5, 40, 20),
    "fire_rating": Range("h", 0.5, 4, 2),
    "M_f": Range("kN.m", 0, 1e6, 250, zero=True),
}
_BARE = r"[0-9]{1,9}(\.[0-9]{0,9})?"
_OUTSIDE = {"f_c": " (A23.3, 8.6.1.1)"}


def read_input(name: str, given: QuantityInput) -> Typed:
    """Read one quantity of :data:`RANGES`; raises :class:`UserError` that names the input."""
    return read_in_range(name, given, RANGES[name], _OUTSIDE.get(name, ""))


def read_in_range(name: str, given: QuantityInput, allowed: Range, why: str = "") -> Typed:
    """Read one quantity that must lie in a range; raises :class:`UserError`.

    ``name`` is what the input is called, ``why`` says where the range comes from.
    """
    if given is None:
        raise UserError(f"{name}: is missing; write for example {_sample(allowed)}")
    low, high = (x * internal_factor(allowed.unit) for x in (allowed.low, allowed.high))
    unit = _unit_meant(given, allowed.unit, low, high)
    if unit:
        raise UserError(f"{name}: {echo(given)} has no unit; write {unit}")
    typed = read_quantity(name, given, allowed.unit, f"{allowed.usual:g}")
    value = typed.value
    if value < 0 or (value == 0 and not allowed.zero):
        what = "negative" if value < 0 else "zero"
        raise UserError(
            f"{name}: {echo(given)} is {what}; write a positive value such as {_sample(allowed)}"
        )
    if not low <= value <= high:
        limits = f"{_plain(allowed.low)} to {_with_unit(allowed.high, allowed)}"
        raise UserError(
            f"{name}: {echo(given)} is outside {limits}{why or ', the range of the method'}; "
            "write a value inside it"
        )
    return typed


def _unit_meant(given: object, usual: str, low: float, high: float) -> str:
    """Return a number without a unit in the units that it may have been meant in; else nothing.

    Where it would be in range in the usual unit that is advised with the error as for any other:
    7600 is a span in mm, not in m.
    """
    text = str(given).strip() if isinstance(given, str | int | float) else ""
    if isinstance(given, bool) or not usual or not re.fullmatch(_BARE, text):
        return ""
    units = usual_units(unit_named(usual))
    meant = [unit for unit in units if low <= float(text) * internal_factor(unit) <= high]
    return "" if not meant or units[0] in meant else " or ".join(f"'{text} {u}'" for u in meant)


def _sample(allowed: Range) -> str:
    return repr(_with_unit(allowed.usual, allowed))


def _with_unit(number: float, allowed: Range) -> str:
    return f"{_plain(number)} {allowed.unit}".rstrip()


def _plain(number: float) -> str:
    return f"{number:g}" if abs(number) < 1e6 else f"{number:.0f}"  # noqa: PLR2004 - no exponents


def one_of(name: str, given: object, allowed: tuple[str, ...]) -> str:
    """Return ``given`` if it is one of the words allowed."""
    if given not in allowed:
        words = ", ".join(repr(word) for word in allowed)
        raise UserError(f"{name}: {echo(given)} is not known; write one of {words}")
    return str(given)


def row_of(name: str, given: object, table: LookupTable) -> str:
    """Return ``given`` if it is a row of the table."""
    table.row(given, name)
    return str(given)


def read_grade(name: str, given: QuantityInput) -> str:
    """Return a grade of reinforcement, or the yield strength of older bars as text with a unit.

    Raises :class:`UserError` for anything else and for a strength outside 200 to 500 MPa.
    """
    try:
        read_quantity(name, given, OLDER_BARS.unit, f"{OLDER_BARS.usual:g}")
    except UserError:
        return _grade_of(name, given)
    return read_in_range(name, given, OLDER_BARS, " (A23.3, 8.5.1; older bars)").text


def _grade_of(name: str, given: object) -> str:
    try:
        return row_of(name, given, GRADES)
    except UserError as error:
        hint = f"; of older bars write the yield strength, such as {_sample(OLDER_BARS)}"
        raise UserError([f"{fault}{hint}" for fault in error.faults]) from None


@dataclass(frozen=True)
class FloorBeamInputs:
    """Checked inputs of one simply supported floor beam."""

    shape: Shape
    span: Typed
    spacing: Typed
    tributary_width: Typed | None
    b_w: Typed
    h: Typed
    h_f: Typed | None
    f_c: Typed
    gamma_c: Typed
    density: str
    grade: str
    superimposed: Typed
    floor_weight: Typed | None
    use: str
    live_load: Typed | None
    exposure: str
    cover: Typed
    aggregate: Typed
    fire_rating: str
    fire_aggregate: str
    stirrup: str
    bottom_bars: BarLayers | None
    compression_bars: BarLayers | None
    top_bars: BarLayers | None
    ends: str
    minimum_rule: str
    waive_minimum_at_ends: bool

    @property
    def slab(self) -> bool:
        """Whether the beam has a flange."""
        return self.h_f is not None


class InputReader:
    """Reads inputs one by one and keeps every fault."""

    def __init__(self, given: Mapping[str, Any]) -> None:
        self.given, self.faults = given, FaultList()

    def take(self, name: str, read: Callable[..., Any], *more: object) -> Any:
        """Read one input by name; note its faults and go on."""
        try:
            return read(name, self.given[name], *more)
        except UserError as error:
            self.faults.take(error)
            return None

    def take_if_given(self, name: str, read: Callable[..., Any], *more: object) -> Any:
        """Read one input that may be left out."""
        return None if self.given[name] is None else self.take(name, read, *more)

    def code_pair(self, project: Mapping[str, Any]) -> Any:
        """Read the locked code pair of the project."""
        try:
            return code_pair(project.get("codes", {}).get("pair", "nothing"))
        except UserError as error:
            self.faults.take(error)
            return None

    def smaller(self, small: str, large: str, read: Mapping[str, Typed | None]) -> None:
        """Note a fault if one size is not smaller than another."""
        first, second = read[small], read[large]
        if first is not None and second is not None and first.value >= second.value:
            self.faults.add(
                f"{small}: {echo(self.given[small])} is not less than {large} of "
                f"{echo(self.given[large])}; write a smaller {small} or a larger {large}"
            )


def read_floor_beam(
    given: Mapping[str, Any], project: Mapping[str, Any]
) -> tuple[FloorBeamInputs, CodePair]:
    """Read and check all inputs and the code pair; raises :class:`UserError` with every fault."""
    reader = InputReader(given)
    take = reader.take
    pair = reader.code_pair(project)
    shape = take("shape", one_of, SHAPES)
    fields = {
        "shape": shape,
        **{
            name: take(name, read_input)
            for name in ("span", "spacing", "b_w", "h", "f_c", "gamma_c", "superimposed",
                         "cover", "aggregate")
        },
        **{
            name: reader.take_if_given(name, read_input)
            for name in ("h_f", "live_load", "tributary_width", "floor_weight")
        },
        "density": take("density", row_of, DENSITY_FACTORS),
        "grade": take("grade", read_grade),
        "use": take("use", _use_inside),
        "exposure": take("exposure", row_of, EXPOSURES),
        "fire_rating": take("fire_rating", read_fire_rating),
        "fire_aggregate": take("fire_aggregate", one_of, tuple(FIRE_SLAB.columns)),
        "stirrup": take("stirrup", row_of, STIRRUP_BENDS),
        "bottom_bars": reader.take_if_given("bottom_bars", read_bars),
        **{
            name: reader.take_if_given(name, read_one_layer)
            for name in ("compression_bars", "top_bars")
        },
        "ends": take("ends", one_of, ENDS),
        "minimum_rule": take("minimum_rule", one_of, MINIMUM_RULES),
        "waive_minimum_at_ends": take("waive_minimum_at_ends", yes_or_no),
    }  # fmt: skip
    take("web_openings", no_openings)
    check_density(fields, given, reader.faults)
    check_flange(fields, given, reader.faults)
    if fields["ends"] == "free" and given["top_bars"] is not None:
        reader.faults.add(
            "top_bars: free ends have no moment to carry; leave them out: top_bars = None"
        )
    reader.smaller("h_f", "h", fields)
    _check_depth(fields, given, reader.faults)
    reader.faults.raise_if_any()
    return FloorBeamInputs(**fields), pair


def read_fire_rating(name: str, given: QuantityInput) -> str:
    """Return the row of the fire tables for a rating."""
    hours = read_input(name, given).value
    for row in FIRE_COVER.rows:
        if abs(float(row.split()[0]) - hours) < 1e-9:  # noqa: PLR2004 - 45 min is 0.75 h
            return row
    raise UserError(
        f"{name}: {echo(given)} is not in the table; write one of {', '.join(FIRE_COVER.rows)}"
    )


def _use_inside(name: str, given: object) -> str:
    """Refuse uses in the open: their snow goes with the live load (NBC 4.1.3.2, cases 2 and 3)."""
    if given in SNOWED_ON:
        raise UserError(
            f"{name}: {echo(given)} carries snow, which this beam does not take; write a use "
            "inside the building"
        )
    return row_of(name, given, USES)


def bare_number(given: object) -> str:
    """Say how a whole number is typed that stands in quotes or has a point; else nothing.

    >>> bare_number("2"), bare_number(2.0), bare_number("two")
    ('2 without quotes', '2 without a point', '')
    """
    if isinstance(given, str) and re.fullmatch(r"[0-9]{1,9}", given.strip()):
        return f"{int(given)} without quotes"
    if isinstance(given, float) and given.is_integer() and abs(given) < 1e9:  # noqa: PLR2004
        return f"{int(given)} without a point"
    return ""


def yes_or_no(name: str, given: object) -> bool:
    """Return a choice that must be True or False."""
    if not isinstance(given, bool):
        raise UserError(f"{name}: {echo(given)} is not a choice; write True or False")
    return given


def no_openings(name: str, given: object) -> None:
    """Refuse web openings."""
    if given not in (None, "none", "", 0, False):
        raise UserError(
            f"{name}: {echo(given)}: a beam with web openings is outside the method; write 'none' "
            "and design the opening region by strut-and-tie"
        )


def check_flange(fields: Mapping[str, Any], given: Mapping[str, Any], faults: FaultList) -> None:
    """Note what a shape lacks of its slab, and a slab, a floor or webs that do not go with it."""
    shape, h_f = fields["shape"], fields["h_f"]
    if shape in ("T", "L") and given["h_f"] is None:
        faults.add(f"h_f: a beam of shape {shape!r} needs its slab; write '140 mm'")
    if (shape == "rectangular") == (given["floor_weight"] is None):
        faults.add(
            "floor_weight: a rectangular beam needs the weight of the floor it carries; write "
            "'3.4 kPa', or '0 kPa' if it carries none"
            if shape == "rectangular"
            else "floor_weight: the slab of a T or an L is counted from h_f; write None"
        )
    if shape == "rectangular" and given["h_f"] is not None:
        faults.add("h_f: a rectangular beam has no flange; write h_f = None, or shape = 'T'")
    if shape == "L" and given["tributary_width"] is None:
        faults.add("tributary_width: an edge beam needs it; write for example '1.7 m'")
    cover = fields["cover"]
    if h_f is not None and cover is not None and h_f.value <= cover.value:
        faults.add(
            f"h_f: {echo(given['h_f'])} is not thicker than its cover of {echo(given['cover'])}; "
            "write a thicker slab"
        )
    spacing, b_w = fields["spacing"], fields["b_w"]
    if shape != "rectangular" and None not in (spacing, b_w) and spacing.value <= b_w.value:
        faults.add(
            f"spacing: {echo(given['spacing'])} is not more than b_w of {echo(given['b_w'])}; "
            "write the distance between the centres of the beams"
        )


def check_density(fields: Mapping[str, Any], given: Mapping[str, Any], faults: FaultList) -> None:
    """Note a fault if concrete called of normal density is lighter than that."""
    gamma_c = fields["gamma_c"]
    if fields["density"] == "normal" and gamma_c is not None and gamma_c.value < LEAST_NORMAL:
        faults.add(
            f"gamma_c: {echo(given['gamma_c'])} is not normal density; write at least "
            f"'{LEAST_NORMAL:g} kg/m3', or density = 'semi-low' or 'low'"
        )


def _check_depth(fields: Mapping[str, Any], given: Mapping[str, Any], faults: FaultList) -> None:
    h, span = fields["h"], fields["span"]
    if span is not None and h is not None and span.value < 2 * h.value:
        faults.add(
            f"span: {echo(given['span'])} is less than twice h of {echo(given['h'])}: a deep beam "
            "is outside the method; use strut-and-tie (A23.3, 10.7)"
        )
