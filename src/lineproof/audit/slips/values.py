"""Other values that may stand by a slip: of another quantity, bar, table row, load, unit, digit."""

from __future__ import annotations

import math
from collections.abc import Callable, Iterator
from functools import partial
from itertools import islice

from lineproof.audit.slips.constants import BARS, BY_SYMBOL, GRADES, ROWS
from lineproof.audit.slips.digits import changed, swapped, written
from lineproof.audit.slips.edits import Line, words_of
from lineproof.audit.slips.kinship import SERVICE
from lineproof.audit.slips.quantities import Other, other_quantities, other_quantity, shown
from lineproof.audit.slips.scope import LOADS
from lineproof.audit.slips.units import ways_of_units
from lineproof.quantity.units import UNITS
from lineproof.record.entry import GIVEN, LOOKUP
from lineproof.standards.nbc.combinations import FACTORS

FACTORED = tuple(
    (factor, f", factored by {factor:g}", f", its factor {factor:g} taken out")
    for factor in map(float, FACTORS)
    if factor > 1
)
"""Load factors, and how it is said that one was used or taken out."""
FIRST_DIGITS = 27
"""So many changes of digits are tried: nine for each of the first three."""
LARGEST_STRAIN = 0.05
"""A bare number below it may be a strain, of which the power of ten is easily lost."""


def others_for(line: Line, target: str, name: str = "") -> Iterator[Other]:
    """Give the values that may stand by a slip where ``target`` belongs."""
    yield from other_quantities(line, target, name)
    yield from others_by_kind(line, target, name)
    yield from _units(line, target, name)
    yield from _digits(line, target, name)


def others_by_kind(line: Line, target: str, name: str = "") -> Iterator[Other]:
    """Give the values that the kind of a quantity suggests: bars, rows of tables, load factors."""
    yield from _bars(line, target, name)
    yield from _tables(line, target, name)
    yield from _loads(line, target, name)


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
    for published in BY_SYMBOL.get(key, ()):
        new, source = published
        said = partial(_changed, line, target, name, new, "", f" ({source})")
        if not math.isclose(new, value):
            yield Other("edition", new, 0.0, said, published=published.is_published)
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
    if symbol == "A_L":
        yield other("tributary", 2.0, ", full for half the tributary area")
        yield other("tributary", 0.5, ", half of the tributary area")
    if symbol in ("x_f", "b_sn"):
        said = "the value at the support axis in place of that at the face: {} = 0"
        yield Other("centreline", 0.0, 0.0, partial(_of, line, target, name, said))
    if scope.units[target] in LOADS[:3]:
        for factor, by, out in FACTORED:
            yield other("factored", factor, by)
            yield other("factored", 1 / factor, out)
    for other_id in scope.same_span(line.node.part, SERVICE.get(scope.stems[target], ())):
        if other_id != target:
            yield other_quantity(line, "service", other_id, target, name)


def _units(line: Line, target: str, name: str) -> Iterator[Other]:
    value, half = line.pairs[target]
    unit = line.scope.units[target]
    is_count = line.scope.symbols[target].startswith("n_")
    for factor, family, why in ways_of_units(unit):
        if unit == "" and (is_count or abs(value) > LARGEST_STRAIN):
            continue
        words = partial(_of, line, target, name, f"{{}} {why}")
        yield Other(family, value * factor, half * factor, words)
    for factor in () if is_count or line.above else (10.0, 0.1):
        words = partial(_of, line, target, name, "the decimal point of {} moved by one place")
        yield Other("decimal", value * factor, half * factor, words)


def _digits(line: Line, target: str, name: str) -> Iterator[Other]:
    node = line.scope.graph[target]
    if line.above and node.kind != GIVEN:
        return
    own = "" if node.kind == GIVEN else " argument"
    families = (f"swapped{own}", f"mistyped{own}")
    number = _read_as(line, target)
    value = line.pairs[target][0]
    if not number or not float(number) or UNITS[node.unit].kind == "angle":
        return
    for family, ways in zip(families, (swapped, changed), strict=True):
        # The first digits are those that a hand copies; further ones would only fit by chance.
        for typed in islice(ways(number), FIRST_DIGITS):
            new = value * float(typed) / float(number)
            said = partial(_mistyped, line, target, name, typed, number)
            yield Other(family, new, 0.0, said)


def _read_as(line: Line, target: str) -> str:
    """Return the number that a value is read as: as it was claimed, else as it was printed."""
    entry = line.scope.graph[target].entry
    ours = entry.get("typed") if entry["kind"] == GIVEN else entry["printed"].get("result")
    return written(line.pairs.typed.get(target) or str(ours or ""))


def _mistyped(line: Line, target: str, name: str, typed: str, number: str) -> str:
    return f"{words_of(line.scope, target, name)} typed as {typed} in place of {number}"


def _changed(line: Line, target: str, name: str, value: float, why: str, source: str = "") -> str:
    """Say what a value was changed to, whose that is, and how it came about."""
    return (
        f"{words_of(line.scope, target, name)} = {shown(line, target, value)}{source} in place of "
        f"{shown(line, target)}{why}"
    )


def _of(line: Line, target: str, name: str, said: str) -> str:
    return said.format(words_of(line.scope, target, name))
