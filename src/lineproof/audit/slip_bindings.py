"""Slips that put another value where a quantity stands: another quantity, place, bar or unit."""

from __future__ import annotations

import math
from collections.abc import Callable, Iterator
from functools import partial
from typing import NamedTuple

from lineproof.audit.slip_constants import BARS, BY_SYMBOL, GRADES, ROWS
from lineproof.audit.slip_digits import changed, swapped, written
from lineproof.audit.slip_edits import TOP, Edit, Line, words_of
from lineproof.audit.slip_kinship import PAIRS, PARTNERS, SERVICE
from lineproof.audit.slip_scope import LOADS, is_next
from lineproof.audit.slip_tree import FAILURES, real
from lineproof.errors import UserError
from lineproof.quantity.digits import rounded_text
from lineproof.quantity.units import UNITS, internal_factor
from lineproof.record.entry import GIVEN, LOOKUP

FACTORS_OF_LOADS = (1.25, 1.5, 1.4)
NEAR_ONE = 1e-6
OF_FOUND = frozenset((
    "pair", "mirror", "clear span", "service", "factored", "tributary", "edition", "unit",
    "swapped", "bar count", "legs", "diameter", "bar size",
))  # fmt: skip
"""Families tried in the arguments of a found value, each at the cost of a run."""
UNITS_BY_KIND: dict[str, tuple[tuple[float, str, str], ...]] = {
    "mm": ((1e-3, "unit", "mm in m"), (1e3, "unit", "m in mm"), (10, "unit", "cm in mm"),
           (0.1, "unit", "mm in cm"), (25.4, "other unit", "inches for mm"),
           (1 / 25.4, "other unit", "mm in inches"), (304.8, "other unit", "feet for mm")),
    "mm2": ((1e-6, "unit", "mm2 in m2"), (1e-2, "unit", "mm2 in cm2"), (100, "unit", "cm2 in mm2"),
            (645.16, "other unit", "square inches for mm2")),
    "mm4": ((1e-12, "unit", "mm4 in m4"), (1e-6, "unit", "10^6 forgotten"), (1e-4, "unit", "cm4")),
    "N": ((1e-3, "unit", "kN for N"), (1e3, "unit", "N for kN"),
          (4.4482216, "other unit", "kip for kN"), (1 / 4.4482216, "other unit", "kN in kip")),
    "N.mm": ((1e-6, "unit", "kN.m for N.mm"), (1e-3, "unit", "kN.mm for N.mm"),
             (1e3, "unit", "kN.mm for kN.m"), (1e6, "unit", "N.mm for kN.m"),
             (1.3558179, "other unit", "kip.ft for kN.m")),
    "N/mm": ((1e-3, "unit", "kN/m in N/m"), (1e3, "unit", "N/m for kN/m"),
             (14.593903, "other unit", "kip/ft for kN/m")),
    "MPa": ((1e-3, "unit", "kPa for MPa"), (1e3, "unit", "MPa in kPa"), (1e6, "unit", "MPa in Pa"),
            (1e-6, "unit", "Pa for MPa"), (1 / 6.894757e-3, "other unit", "MPa in psi"),
            (6.894757, "other unit", "ksi for MPa")),
    "N/mm3": ((1e-3, "unit", "kN/m3 by 1000"), (1e3, "unit", "kN/m3 by 1000")),
    "N.mm2": ((1e-9, "unit", "kN.m2 for N.mm2"),),
    "deg": ((math.pi / 180, "unit", "radians for degrees"), (180 / math.pi, "unit", "degrees")),
    "": ((1e3, "unit", "the power of ten of a strain"), (1e-3, "unit", "the power of ten")),
}  # fmt: skip
"""By internal unit: the factor of a slip of units, its family, and what was taken for what."""


POWERS = (1e3, 1e-3, 1e6, 1e-6)


def ways_of_units(unit: str) -> Iterator[tuple[float, str, str]]:
    """Give the slips of units for an internal unit: the usual ones, then plain powers of ten."""
    usual = UNITS_BY_KIND.get(unit, ())
    yield from usual
    for power in POWERS if unit else ():
        if all(abs(power / factor - 1) > NEAR_ONE for factor, _, _ in usual):
            yield power, "other unit", f"10^{round(math.log10(power))} too much"


class Other(NamedTuple):
    """Another value for a quantity: family, value, half width, words, and how far-fetched."""

    family: str
    value: float
    half: float
    words: Callable[[], str]
    far: float = 0.0


def edits_of_bindings(line: Line) -> Iterator[Edit]:
    """Give every edit that puts another value where a quantity stands in a line's formula."""
    for name, target in line.node.args.items():
        at = line.places.uses(name)
        if not at or target not in line.scope.units:
            continue
        ways = [tuple(at)] + ([(k,) for k in at] if len(at) > 1 else [])
        for other in others_for(line, target, name):
            for places in ways if other.family in ("pair", "kin", "near", "unit") else ways[:1]:
                far = other.far + (0.7 if len(places) < len(at) else 0.0)
                yield Edit(other.family, places, other.value, other.half, other.words, far)


def edits_of_arguments(line: Line) -> Iterator[Edit]:
    """Give the edits of a found value: its procedure run with another value for one argument."""
    named = {name: line.pairs[target][0] for name, target in line.node.args.items()}
    value, half = line.pair(0)
    relative = half / abs(value) if value else 0.0
    for name, target in line.node.args.items():
        for other in others_for(line, target, name):
            if other.family not in OF_FOUND:
                continue
            try:
                made = real(line.node.compute(named | {name: other.value}))
            except (*FAILURES, UserError):
                continue
            yield Edit(other.family, TOP, made, abs(made) * relative, other.words, other.far)


def others_for(line: Line, target: str, name: str = "") -> Iterator[Other]:
    """Give the values that may stand by a slip where ``target`` belongs."""
    yield from _quantities(line, target, name)
    yield from _bars(line, target, name)
    yield from _tables(line, target, name)
    yield from _loads(line, target, name)
    yield from _units(line, target, name)
    yield from _digits(line, target, name)


def shown(line: Line, entry_id: str, value: float | None = None) -> str:
    """Return a value in its printed unit: ``380 mm``."""
    unit = line.scope.graph[entry_id].unit
    number = line.pairs[entry_id][0] if value is None else value
    text = rounded_text(number / internal_factor(unit), 4) if number else "0"
    return f"{text} {unit}".strip()


def _in_place(line: Line, other: str, target: str, name: str) -> str:
    return (
        f"{words_of(line.scope, other)} = {shown(line, other)} in place of "
        f"{words_of(line.scope, target, name)} = {shown(line, target)}"
    )


def _changed(line: Line, target: str, name: str, value: float, why: str) -> str:
    return (
        f"{words_of(line.scope, target, name)} = {shown(line, target, value)} in place of "
        f"{shown(line, target)}{why}"
    )


def _quantities(line: Line, target: str, name: str) -> Iterator[Other]:
    scope = line.scope
    unit, own = scope.units[target], scope.symbols[target]
    seen = {target, line.node.id}
    near = [*scope.near(line.node.part, unit), *scope.kin(target)]
    for partners in {PARTNERS.get(scope.stems[target], ()), PARTNERS.get(name, ())}:
        near += scope.same_span(line.node.part, partners)
        near += scope.same_span("", partners)
    for other in near:
        if other in seen or scope.units[other] != unit:
            continue
        seen.add(other)
        family, far = _kinship(line, target, other, name)
        yield _other(line, family, other, target, name, far)
    for other in scope.by_symbol[own]:
        if other not in seen:
            seen.add(other)
            here, there = scope.graph[target].part, scope.graph[other].part
            next_to = is_next(here, there) or is_next(line.node.part, there)
            yield _other(line, "mirror" if next_to else "place", other, target, name, 0.0)
    for other in _numbered(line, target):
        if other not in seen:
            seen.add(other)
            yield _other(line, "mirror", other, target, name, 0.0)
    for other in scope.far(line.node.part, unit, own[0]):
        if other not in seen:
            yield _other(line, "far", other, target, name, 0.0)


def _other(line: Line, family: str, other: str, target: str, name: str, far: float) -> Other:
    value, half = line.pairs[other]
    return Other(family, value, half, partial(_in_place, line, other, target, name), far)


def _numbered(line: Line, target: str) -> Iterator[str]:
    """Give the same quantity of another span, support or load case: ``l_2`` for ``l_1``."""
    scope = line.scope
    stem = scope.stems[target]
    if stem != scope.symbols[target]:
        yield from scope.by_stem[stem, scope.units[target]]


def _kinship(line: Line, target: str, other: str, name: str) -> tuple[str, float]:
    scope = line.scope
    stems = {scope.stems[target], name}
    theirs = scope.stems[other]
    if {"l", "l_n"} in ({own, theirs} for own in stems):
        return "clear span", 0.0
    if any(frozenset((own, theirs)) in PAIRS for own in stems):
        return "pair", 0.0
    if any(own in SERVICE and theirs in SERVICE[own] for own in stems):
        return "service", 0.0
    same_letter = theirs[0] in {own[0] for own in stems if own}
    return ("kin", 0.0) if same_letter else ("near", 0.0)


def _bars(line: Line, target: str, name: str) -> Iterator[Other]:
    scope = line.scope
    symbol, unit = scope.symbols[target], scope.units[target]
    value, half = line.pairs[target]

    def other(family: str, new: float, why: str) -> Other:
        spread = half * abs(new / value) if value else 0.0
        return Other(family, new, spread, partial(_changed, line, target, name, new, why))

    if symbol.startswith("n_") and unit == "" and value == round(value):
        if symbol in ("n_v", "n_d"):
            for legs in {1.0, 2.0, 3.0, 4.0} - {value}:
                yield other("legs", legs, " legs")
        else:
            for count in {value - 1, value + 1, value + 2, value - 2} - {0.0, -1.0}:
                far = 0.0 if abs(count - value) == 1 else 1.0
                yield other("bar count", count, " bars")._replace(far=far)
    elif symbol.startswith("d_b") and unit == "mm":
        yield from _diameters(value, other)
    elif symbol.startswith("A_") and unit == "mm2" and not symbol.startswith(("A_g", "A_e")):
        yield from _areas(line, target, name, other)


def _diameters(value: float, other: Callable[[str, float, str], Other]) -> Iterator[Other]:
    yield other("diameter", value / 2, ", the radius for the diameter")
    yield other("diameter", value * 2, ", the diameter for the radius")
    for size, diameter, _ in BARS:
        if math.isclose(diameter, value):
            yield other("diameter", float(size[:-1]), ", the size taken for the diameter")
        else:
            yield other("bar size", diameter, f", a bar {size}")


def _areas(
    line: Line, target: str, name: str, other: Callable[[str, float, str], Other]
) -> Iterator[Other]:
    symbol, value = line.scope.symbols[target], line.pairs[target][0]
    for size, diameter, area in BARS:
        if line.scope.graph[target].kind != LOOKUP:
            break
        if math.isclose(area, value):
            number = float(size[:-1])
            yield other("diameter", math.pi * number**2 / 4, ", from the size as a diameter")
            yield other("diameter", math.pi * diameter**2 / 4, ", from the diameter")
            yield other("diameter", math.pi * diameter**2, ", the diameter for the radius")
        else:
            yield other("bar size", area, f", a bar {size}")
    if symbol in ("A_v", "A_tr", "A_h") or name == "A_v":
        yield other("legs", value / 2, ", half of the legs")
        yield other("legs", value * 2, ", twice the legs")
        yield other("diameter", value * 4, ", the diameter for the radius")
        yield other("diameter", value / 4, ", the radius for the diameter")
    elif symbol in ("A_t", "A_bs"):
        yield other("legs", value * 2, ", two legs")
    else:
        yield other("diameter", value / 4, ", the radius for the diameter")
        yield other("diameter", value * 4, ", the diameter for the radius")
        yield from _recounted(line, target, value, other)


def _recounted(
    line: Line, target: str, value: float, other: Callable[[str, float, str], Other]
) -> Iterator[Other]:
    """Give the area with a bar more or less, where the area is that of a number of bars."""
    scope = line.scope
    for argument in scope.graph[target].args.values():
        if scope.symbols.get(argument, "").startswith("n_"):
            count = line.pairs[argument][0]
            for bars in (count - 1, count + 1):
                if count > 1 and bars > 0:
                    why = f", with {bars:.0f} bars for {count:.0f}"
                    yield other("bar count", value * bars / count, why)


def _tables(line: Line, target: str, name: str) -> Iterator[Other]:
    scope = line.scope
    symbol = scope.stems[target]
    value = line.pairs[target][0]
    # beta_g and theta_g are beta and theta of the other method, f_yt the f_y of stirrups.
    key = symbol if symbol in BY_SYMBOL else name
    for new, source in BY_SYMBOL.get(key, ()):
        said = partial(_changed, line, target, name, new, f" ({source})")
        if not math.isclose(new, value):
            yield Other("edition", new, 0.0, said)
    for new in ROWS.get(symbol, ()):
        if not math.isclose(new, value):
            said = partial(_changed, line, target, name, new, ", another row of the table")
            yield Other("table row", new, 0.0, said)
    for new in GRADES.get(symbol, ()):
        if not math.isclose(new, value):
            said = partial(_changed, line, target, name, new, ", another strength")
            yield Other("grade", new, 0.0, said)


def _loads(line: Line, target: str, name: str) -> Iterator[Other]:
    scope = line.scope
    value, half = line.pairs[target]
    symbol = scope.symbols[target]

    def other(family: str, factor: float, why: str) -> Other:
        said = partial(_changed, line, target, name, value * factor, why)
        return Other(family, value * factor, half * factor, said)

    if symbol in ("b_tr", "s_b"):
        yield other("tributary", 2.0, ", full for half the tributary width")
        yield other("tributary", 0.5, ", half of the tributary width")
    if symbol in ("x_f", "b_sn"):
        said = partial(
            "the value at the support axis in place of that at the face: {} = 0".format,
            words_of(scope, target, name),
        )
        yield Other("centreline", 0.0, 0.0, said)
    if scope.units[target] in LOADS[:3]:
        for factor in FACTORS_OF_LOADS:
            yield other("factored", factor, f", factored by {factor:g}")
            yield other("factored", 1 / factor, f", its factor {factor:g} taken out")
    for other_id in scope.same_span(line.node.part, SERVICE.get(scope.stems[target], ())):
        if other_id != target:
            yield _other(line, "service", other_id, target, name, 0.0)


def _units(line: Line, target: str, name: str) -> Iterator[Other]:
    value, half = line.pairs[target]
    unit = line.scope.units[target]
    is_count = line.scope.symbols[target].startswith("n_")
    for factor, family, why in ways_of_units(unit):
        if unit == "" and (is_count or abs(value) > 0.05):  # noqa: PLR2004 - strains are small
            continue
        words = partial("{} in the wrong unit: {}".format, words_of(line.scope, target, name), why)
        yield Other(family, value * factor, half * factor, words)
    for factor in () if is_count else (10.0, 0.1):
        words = partial(
            "the decimal point of {} moved by one".format, words_of(line.scope, target, name)
        )
        yield Other("decimal", value * factor, half * factor, words)


def _digits(line: Line, target: str, name: str) -> Iterator[Other]:
    node = line.scope.graph[target]
    if node.kind == GIVEN:
        number, families = written(str(node.entry.get("typed", ""))), ("swapped", "mistyped")
    else:
        number = written(str(node.entry["printed"].get("result", "")))
        families = ("mistyped argument", "mistyped argument")
    value = line.pairs[target][0]
    if not number or not float(number) or UNITS[node.unit].kind == "angle":
        return
    # Only what was typed by hand is searched for one changed digit; the rest would fit by chance.
    for family, ways in zip(families, (swapped, changed)[: 1 + (node.kind == GIVEN)], strict=False):
        for typed in ways(number):
            new = value * float(typed) / float(number)
            said = partial(_mistyped, line, target, name, typed, number)
            yield Other(family, new, 0.0, said)


def _mistyped(line: Line, target: str, name: str, typed: str, number: str) -> str:
    return f"{words_of(line.scope, target, name)} typed as {typed} in place of {number}"
