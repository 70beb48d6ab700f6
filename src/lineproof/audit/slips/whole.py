"""Slips of the result as a whole: wrong unit, sign, digit, row, or another way of getting there."""

from __future__ import annotations

import math
from collections.abc import Iterator
from functools import partial

from lineproof.audit.data import Claim, read_from
from lineproof.audit.slips.digits import changed, swapped, written
from lineproof.audit.slips.edits import TOP, Edit, Line, words_of, workable
from lineproof.audit.slips.quantities import shown
from lineproof.audit.slips.scope import LOADS, is_next
from lineproof.audit.slips.thumb import rules_of_thumb
from lineproof.audit.slips.units import ways_of_units
from lineproof.audit.slips.values import others_by_kind
from lineproof.errors import UserError
from lineproof.quantity.units import internal_factor
from lineproof.standards.nbc.combinations import DEAD, LIVE

BY_ONE = 1.0
"""A last digit that is one off was hardly mistyped."""
OF_MOMENT = (8, 12, 10, 11, 14, 16, 9, 24, 2, 4)
"""Divisors of w l^2: simple span first, then fixed ends, coefficients of 9.3.3, cantilever."""
OF_SHEAR = ((0.5, "/2"), (0.575, "*1.15/2"), (0.625, "*5/8"), (0.375, "*3/8"))


def edits_of_result(line: Line) -> Iterator[Edit]:
    """Give the slips that replace the whole result of a line."""
    yield from _rows(line)
    yield from workable(_moments(line))
    for other in others_by_kind(line, line.node.id):
        if other.family != "centreline" and (other.family != "factored" or line.node.is_computed):
            family = "result factored" if other.family == "factored" else other.family
            yield other._replace(family=family).edit(TOP, line.node.id)
    yield from workable(_factored(line))
    yield from rules_of_thumb(line)


def edits_of_copy(line: Line, claim: Claim) -> Iterator[Edit]:
    """Give the slips made when the result was written down: unit, sign, decimal point."""
    value, half = line.pair(0)
    yield Edit("sign", TOP, -value, half, partial("{}".format, "the sign of the result turned"))
    for factor, family, why in ways_of_units(line.scope.units[line.node.id]):
        words = partial("the result {}".format, why)
        own = "result unit" if family == "unit" else family
        yield Edit(own, TOP, value * factor, half * factor, words)
    for power in (1, -1, 2, -2):
        places = "one place" if abs(power) == 1 else f"{abs(power)} places"
        words = partial("the decimal point of the result moved by {}".format, places)
        size = 10.0**power
        yield Edit("decimal", TOP, value * size, half * size, words, 0.5 * (abs(power) - 1))
    yield from _miscopied(line, claim)


def _rows(line: Line) -> Iterator[Edit]:
    """Give the results of other rows: of the same symbol elsewhere, of lines next to this one."""
    scope, node = line.scope, line.node
    unit = scope.units[node.id]
    same = scope.by_symbol[node.symbol]
    rows = [("next row", i) for i in same if is_next(node.part, scope.graph[i].part)]
    rows += [("row", i) for i in scope.near(node.part, unit) if scope.graph[i].part == node.part]
    rows += [("row of another place", i) for i in same]
    values = {line.pair(0)[0]}
    for family, other in rows:
        value, half = line.pairs[other]
        if value not in values:
            values.add(value)
            words = partial(_copied, line, other)
            yield Edit(family, TOP, value, half, words, swap=(node.id, other))


def _copied(line: Line, other: str) -> str:
    return f"{words_of(line.scope, other)} = {shown(line, other)} written in this row"


def _moments(line: Line) -> Iterator[Edit]:
    """Give w l^2/8 and its like where a beam of more spans is analysed, w l/2 for its shears."""
    unit = line.scope.units[line.node.id]
    if unit not in LOADS[:2] or line.node.symbol[0] not in "MV":
        return
    sign = math.copysign(1.0, line.pair(0)[0])
    for load in _loads_of(line):
        for span in _spans_of(line):
            w, half_w = line.pairs[load]
            l, half_l = line.pairs[span]
            relative = (half_w / abs(w) if w else 0.0) + 2 * half_l / l if l else 0.0
            for value, text in _simple(unit, w, l):
                words = partial(_by_simple, line, load, span, text)
                family = "simple span" if text in ("**2/8", "/2") else "coefficient"
                half = abs(value * relative)
                yield Edit(family, TOP, sign * value, half, words, swap=(line.node.id, ""))


def _simple(unit: str, w: float, l: float) -> Iterator[tuple[float, str]]:
    if unit == "N.mm":
        yield from ((w * l**2 / by, f"**2/{by}") for by in OF_MOMENT)
    else:
        yield from ((w * l * factor, text) for factor, text in OF_SHEAR)


def _by_simple(line: Line, load: str, span: str, text: str) -> str:
    first, second = words_of(line.scope, load), words_of(line.scope, span)
    simple = "simple span" if text in ("**2/8", "/2") else "coefficient"
    symbols = line.scope.symbols
    return f"{symbols[load]}*{symbols[span]}{text} ({simple}), of {first} and {second}"


def _over(line: Line) -> list[str]:
    """Return the values up to three lines above, the nearest first."""
    reached: dict[str, None] = {}
    edge = [line.node.id]
    for _ in range(3):
        edge = [a for e in edge for a in line.scope.graph.sources[e] if a in line.scope.units]
        reached |= dict.fromkeys(edge)
    return list(reached)


def _loads_of(line: Line) -> list[str]:
    scope = line.scope
    # A support moment rests on loads by type; the factored load of its case stands beside it.
    beside = [n.id for n in scope.by_part[line.node.part] if scope.units.get(n.id) == "N/mm"]
    near = [e for e in dict.fromkeys((*_over(line), *beside)) if scope.units[e] == "N/mm"]
    factored = [e for e in near if scope.stems[e] in ("w_f", "w_s")]
    return (factored or near)[:4]


def _spans_of(line: Line) -> list[str]:
    scope = line.scope
    spans = [e for e in _over(line) if scope.stems[e] == "l" and scope.units[e] == "mm"][:3]
    clear = [e for s in spans for e in scope.graph.users[s] if scope.symbols.get(e) == "l_n"]
    return [*spans, *clear]


def _factored(line: Line) -> Iterator[Edit]:
    """Give a sum of specified loads with their factors on the dead and on the live ones."""
    if not line.is_load or not line.node.symbol.startswith(("w_s", "M_h", "M_m", "R_", "delta")):
        return
    places, total, half = line.places, 0.0, 0.0
    seen = set()
    for at, place in enumerate(places.places):
        name = getattr(place.tree, "id", "")
        if name in line.node.args:
            is_live = "L" in name.partition("_")[2]
            is_dead = "D" in name.partition("_")[2]
            if not is_live and not is_dead:
                return
            seen.add(is_live)
            factor = float(LIVE if is_live else DEAD)
            slope = places.with_place(at, places.values[at] * 2) - places.values[0]
            total += slope * factor
            half += abs(slope) * factor * 1e-4
    if seen:
        words = partial(
            "{}".format, f"factored loads, {DEAD} on dead and {LIVE} on live, for specified"
        )
        yield Edit("service", TOP, total, line.pair(0)[1] * 1.5, words)


def _miscopied(line: Line, claim: Claim) -> Iterator[Edit]:
    """Give the number that the claim may be a slip of the pen for, if it follows here."""
    number = written(claim.typed)
    value, half = line.pair(0)
    try:
        factor = internal_factor(claim.unit)
    except (KeyError, UserError):
        return
    if not number or not value:
        return
    for family, ways in (("swapped result", swapped), ("mistyped result", changed)):
        near = []
        for meant in ways(number):
            if meant.lstrip("-")[:1] == "0" != number.lstrip("-")[:1]:
                continue  # nobody writes 0800
            interval = read_from(meant).times(factor)
            if interval.low - half <= value <= interval.high + half:
                near.append((abs(value - interval.middle), meant, value - interval.middle))
        if near:
            _, meant, off = min(near)
            words = partial("the result {} written as {}".format, meant, number)
            far = BY_ONE if _by_one_in_the_last(meant, number) else 0.0
            # What the claim would be if the line's own value had met the same slip.
            yield Edit(family, TOP, claim.value + off, half, words, far)


def _by_one_in_the_last(first: str, second: str) -> bool:
    """Tell whether two numbers differ by one in their last digit: that is rounding as a rule."""
    changed = sum(a != b for a, b in zip(first, second, strict=True))
    digits = (first.rstrip("0") or "0")[-1], (second.rstrip("0") or "0")[-1]
    return changed == 1 and first[-1] != second[-1] and abs(ord(digits[0]) - ord(digits[1])) == 1
