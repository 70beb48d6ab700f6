"""The slips that make sense on a sheet: rows of the table that fit, bars, zones, units, digits."""

from __future__ import annotations

import re
from collections.abc import Callable, Iterator, Mapping
from dataclasses import dataclass, replace
from decimal import Decimal
from functools import cache, lru_cache
from itertools import pairwise
from random import Random

from lineproof.audit.graph import Graph, Node, evaluated
from lineproof.formula import Tree, names_of, parse_expression
from lineproof.quantity.units import internal_factor

from . import planting_rows as rows
from .planting_rows import ROWS

Values = dict[str, float]
RADIAN = "57.29577951308"
"""Degrees of a radian."""
AREA_ABOVE = {100: 200, 200: 300, 300: 500, 500: 700, 700: 1000}
DIAMETER_ABOVE = {11.3: 16.0, 16.0: 19.5, 19.5: 25.2, 25.2: 29.9, 29.9: 35.7}
"""Area [mm2] and diameter [mm] of the next thicker bar, of the metric series 10M to 35M."""


@dataclass(frozen=True)
class Planted:
    """A slip at a line: its kind, the value that was worked, and what a sentence must name.

    ``work`` gives the wrong value from the values on the sheet; ``inputs`` are givens that were
    written otherwise with it; ``written`` is a slip of the pen: the value was worked and used
    rightly. ``beyond`` tells whether the slip moves the line beyond rounding.
    """

    kind: str
    id: str
    what: str
    work: Callable[[Values], float]
    says: tuple[str, ...]
    inputs: tuple[tuple[str, float], ...] = ()
    beyond: bool = True
    written: Callable[[float], float] | None = None


@cache
def tree_of(text: str) -> Tree:
    """Return the tree of a formula's right side."""
    return parse_expression(text)


def right_side(node: Node) -> str:
    """Return what stands behind the equals sign of a line."""
    return str(node.entry["formula"]).partition("= ")[2]


def found_near(graph: Graph, node: Node, name: str) -> str | None:
    """Return the id that a name means at a line to somebody who looks for it on the sheet.

    First what the line rests on, the nearest first; then the part; then the span; then the givens.
    """
    waiting, seen = [node.id], {node.id}
    while waiting:
        here = graph[waiting.pop(0)]
        if name in here.args and here.args[name] in graph.nodes:
            return here.args[name]
        for target in here.args.values():
            if target not in seen and target in graph.nodes:
                if graph[target].symbol == name and graph[target].has_value:
                    return target
                seen.add(target)
                waiting.append(target)
    return _beside(graph, node, name)


def _beside(graph: Graph, node: Node, name: str) -> str | None:
    for other in graph:
        if other.part == node.part and name in other.args and other.args[name] in graph.nodes:
            return other.args[name]
    span = re.search(r"l_(\d)", node.args.get("l", ""))
    places = [node.part, *([f"span-{span[1]}"] if span else []), "given", "materials", "stirrups"]
    for place in places:
        if f"{place}/{name}" in graph.nodes:
            return f"{place}/{name}"
    return None


def worked_by(graph: Graph, node: Node, text: str) -> Callable[[Values], float] | None:
    """Return what works another formula at a line; None where a name of it is not on the sheet."""
    tree, targets = tree_of(text), dict(node.args)
    for name in names_of(tree):
        if name not in targets:
            target = found_near(graph, node, name)
            if target is None:
                return None
            targets[name] = target
    return lambda values: evaluated(tree, {n: values[t] for n, t in targets.items()})


Making = Iterator[Planted]


PLACES = {
    rows.SIMPLE: ("sag", "deflection"),
    rows.FACE: ("hog", "shear"),
}
"""Parts in which a kind of slip makes sense; any part for the others."""


def from_rows(graph: Graph, node: Node) -> Making:
    """Give the slips of the table that fit a line."""
    for row in ROWS:
        if row.right == right_side(node) and node.part.startswith(PLACES.get(row.kind, ("",))):
            work = worked_by(graph, node, row.wrong)
            if work is not None:
                yield Planted(row.kind, node.id, row.wrong, work, row.says)


_COMBINED = re.compile(r"1\.25\*(\w+)((?: \+ 1\.5\*\w+)+)\Z")
_SERVICE = re.compile(r"(w_D\d?) \+ (w_L\w*)\Z")


def from_patterns(graph: Graph, node: Node) -> Making:
    """Give slips of formulas that are written for one beam: combinations, and cot of an angle."""
    text = right_side(node)
    made: list[tuple[str, str, tuple[str, ...]]] = []
    service = ("~service", "~factor", "~1.25", "~1.5")
    if _COMBINED.match(text):
        made.append((rows.SERVICE, re.sub(r"\d\.\d+\*", "", text), service))
        other = text.replace("1.25*", "1.2*").replace("1.5*", "1.6*")
        made.append((rows.STANDARD, other, ("~1.2 & 1.6", "~ACI")))
    if _SERVICE.match(text):
        made.append((rows.SERVICE, _SERVICE.sub(r"1.25*\1 + 1.5*\2", text), service))
    if "cot(theta)" in text:
        # tan of the grammar takes degrees: theta radians are theta x 180/pi of them
        wrong = text.replace("cot(theta)", f"(1/tan(theta*{RADIAN}))")
        made.append((rows.DEGREES, wrong, ("theta", "cot", "tan", "~radian")))
    for kind, wrong, says in made:
        work = worked_by(graph, node, wrong)
        if work is not None:
            yield Planted(kind, node.id, wrong, work, says)


def from_bars(graph: Graph, node: Node) -> Making:
    """Give slips with bars: the next row of the table, a count changed without its area."""
    text, args = right_side(node), node.args
    if text == "n_b*A_b":
        above = AREA_ABOVE.get(round(graph.stored[args["A_b"]]))
        if above:
            work = worked_by(graph, node, f"n_b*{above}")
            yield Planted(rows.BAR_ROW, node.id, f"n_b*{above}", _known(work), ("A_b", "bar"))
        n = args["n_b"]
        if graph[n].kind == "given":
            right, count = graph.stored[node.id], graph.stored[n]
            more = ((n, count + 1),)
            says = ("n_b", graph[n].symbol, "bar", "number")
            yield Planted(rows.COUNT, node.id, "area of the old count", _same(right), says, more)
    if text == rows.D:
        above_d = DIAMETER_ABOVE.get(round(graph.stored[args["d_b"]], 1))
        if above_d:
            wrong = f"h - c_c - d_bs - {above_d}/2"
            work = worked_by(graph, node, wrong)
            yield Planted(rows.BAR_ROW, node.id, wrong, _known(work), ("d_b", "bar"))


def _known(work: Callable[[Values], float] | None) -> Callable[[Values], float]:
    assert work is not None
    return work


def _same(value: float) -> Callable[[Values], float]:
    return lambda _: value


@lru_cache(maxsize=2)
def on_sheet(graph: Graph) -> tuple[dict[str, int], dict[str, list[str]]]:
    """Return the places of the lines on a sheet, and the lines by their symbol."""
    named: dict[str, list[str]] = {}
    for node in graph:
        named.setdefault(node.symbol, []).append(node.id)
    return {i: place for place, i in enumerate(graph.nodes)}, named


def from_neighbours(graph: Graph, node: Node) -> Making:
    """Give slips between places: another zone's value in the line, the other face's result."""
    kind = node.part.partition("-")[0]
    if kind not in ("shear", "sag", "hog", "deflection"):
        return
    for name, target in node.args.items():
        if graph[target].part == node.part or name in ("s", "theta", "A_s", "d", "I_g"):
            yield from _from_zone(graph, node, name, kind)
    if node.part.endswith("-right"):
        other = f"{node.part.removesuffix('right')}left/{node.symbol}"
        if other in graph.nodes and node.symbol in ("M_f", "V_f", "M_r", "V_r", "V_c", "V_s"):
            says = ("~left & right", "~other", graph[other].label, f"~{graph[other].part}")
            yield Planted(rows.SIDE, node.id, f"as {other}", lambda v: v[other], says)


def _from_zone(graph: Graph, node: Node, name: str, kind: str) -> Making:
    target = graph[node.args[name]]
    places, named = on_sheet(graph)
    for other in named[target.symbol]:
        there = graph[other]
        if (
            places[other] < places[node.id] and there.part.startswith(kind)
            and there.part.count("-") == target.part.count("-") and there.part != target.part
            and abs(there.stored - target.stored) > 1e-6 * abs(target.stored)
        ):  # fmt: skip
            says = (name, there.symbol, f"~{there.part}", f"~{there.label}")
            work = _with(node, {name: other})
            yield Planted(rows.ZONE, node.id, f"{name} = {other}", work, says)


def _with(node: Node, swapped: Mapping[str, str]) -> Callable[[Values], float]:
    targets = dict(node.args) | dict(swapped)
    return lambda values: node.compute({n: values[t] for n, t in targets.items()})


def from_writing(graph: Graph, node: Node, draw: Random) -> Making:
    """Give slips of writing: a unit, digits of the result, digits of an argument."""

    def right(values: Values) -> float:
        return node.compute(graph.named(node, values))

    def other_digits(value: float) -> float:
        return changed_digits(value, node.unit, node.id)

    if node.unit in ("kN", "kN.m", "kN/m", "MPa"):
        factor = draw.choice([1000.0, 0.001])
        what, unit = f"times {factor}", ("~unit", "~1000", "~thousand", "~10\\^", "~kN")
        yield Planted(rows.UNIT, node.id, what, lambda v: right(v) * factor, unit)
        pen = Planted(rows.UNIT_WRITTEN, node.id, f"written {what}", right, unit)
        yield replace(pen, written=lambda value: value * factor)
    what, says = "digits of the result", ("~digit", "~transposed")
    yield Planted(rows.DIGIT, node.id, what, lambda v: other_digits(right(v)), says)
    pen = Planted(rows.DIGIT_WRITTEN, node.id, f"written, {what}", right, says)
    yield replace(pen, written=other_digits)
    named = [n for n, t in node.args.items() if graph[t].kind in ("given", "line") and n != "x_f"]
    if named:
        yield _misread(graph, node, draw.choice(named))


def _misread(graph: Graph, node: Node, name: str) -> Planted:
    target = graph[node.args[name]]

    def misread(values: Values) -> float:
        args = graph.named(node, values)
        args[name] = changed_digits(args[name], target.unit, f"{node.id} {name}", padded=False)
        return node.compute(args)

    says = (name, target.symbol)
    return Planted(rows.DIGIT_IN, node.id, f"digits of {name}", misread, says)


def changed_digits(value: float, unit: str, seed: str, *, padded: bool = True) -> float:
    """Return a value with two digits of its three exchanged, or one digit written otherwise.

    Not ``padded``, zeros behind the point that only fill up the three digits are not written.
    """
    draw = Random(seed)  # noqa: S311 - the same slip every time
    text = three_digits(value / internal_factor(unit))
    if not padded and "." in text:
        text = text.rstrip("0").rstrip(".")
    places = [i for i, c in enumerate(text) if c.isdigit()]
    first = next((k for k, i in enumerate(places) if text[i] != "0"), None)
    if first is None:
        return value
    places = places[first : first + 3]
    digits = list(text)
    pairs = [
        (i, j) for i, j in pairwise(places)
        if text[i] != text[j] and text[j] != "0"
    ]  # fmt: skip
    if pairs and draw.random() < 0.6:
        i, j = draw.choice(pairs)
        digits[i], digits[j] = digits[j], digits[i]
    else:
        i = draw.choice(places)
        digits[i] = draw.choice([c for c in "123456789" if c != text[i]])
    return float("".join(digits)) * internal_factor(unit)


def all_slips(graph: Graph, draw: Random) -> dict[str, list[Planted]]:
    """Return by kind the slips that make sense somewhere on a sheet."""
    found: dict[str, list[Planted]] = {kind: [] for kind in rows.KINDS}
    for node in graph:
        if node.kind == "line":
            makers = (from_rows, from_patterns, from_bars, from_neighbours)
            for maker in makers:
                for planted in maker(graph, node):
                    found[planted.kind].append(planted)
            for planted in from_writing(graph, node, draw):
                found[planted.kind].append(planted)
    return found


def three_digits(number: float) -> str:
    """Write a number with three digits, as one does by hand: 0.00207, 43.6, 1500, 12300.

    >>> three_digits(512.055), three_digits(0.000669853), three_digits(1499.9), three_digits(-1e-13)
    ('512', '0.000670', '1500', '0')
    """
    if abs(number) < 1e-10:
        return "0"
    return format(Decimal(f"{number:.2e}"), "f")
