"""Slips in the constants of a formula: another document's, a digit mistyped, load factors."""

from __future__ import annotations

from collections.abc import Iterator
from functools import partial

from lineproof.audit.graph import Node
from lineproof.audit.slips.constants import LOAD_PAIRS, Other, of_constant
from lineproof.audit.slips.digits import changed, swapped
from lineproof.audit.slips.edits import TOP, Edit, Line, workable
from lineproof.formula.tree import Number
from lineproof.standards.nbc.combinations import DEAD, LIVE

ALL_LEFT_OUT = "every load factor left out, specified loads for factored ones"


def edits_of_numbers(line: Line) -> Iterator[Edit]:
    """Give every edit of the constants in a line's formula."""
    for at, place in enumerate(line.places.places):
        if isinstance(place.tree, Number):
            yield from _number(line, at, place.tree.text)
    yield from _constants_together(line)
    yield from _service(line)
    yield from workable(_load_pairs(line))


def _number(line: Line, at: int, text: str) -> Iterator[Edit]:
    yield from _other_constants(line, (at,), text, is_load=line.is_load_factor(at))
    for typed in () if line.above else (*swapped(text), *changed(text)):
        words = partial("the constant {} mistyped as {}".format, text, typed)
        yield Edit("mistyped constant", (at,), float(typed), 0.0, words)


def _constants_together(line: Line) -> Iterator[Edit]:
    """Give another value for a constant at every place where it stands: 600/(600 + f_y)."""
    found: dict[str, list[int]] = {}
    for at, place in enumerate(line.places.places):
        if isinstance(place.tree, Number):
            found.setdefault(place.tree.text, []).append(at)
    for text, places in found.items():
        if len(places) > 1:
            yield from _other_constants(line, tuple(places), text, is_load=False)


def _other_constants(
    line: Line, at: tuple[int, ...], text: str, *, is_load: bool
) -> Iterator[Edit]:
    """Give what other documents have for a constant, by the formula's symbol and by the line's."""
    symbol = line.scope.stems[line.node.id]
    own = _symbol_of(line.node)
    others = of_constant(own, text, is_load=is_load)
    if symbol != own:
        others = (*others, *of_constant(symbol, text, is_load=False))
    for other in others:
        words = partial(_constant_said, other, text)
        yield Edit("edition", at, other.value, 0.0, words, published=other.is_published)


def _constant_said(other: Other, text: str) -> str:
    return f"{other.value:.6g} ({other.source}) in place of the constant {text}"


def _load_pairs(line: Line) -> Iterator[Edit]:
    """Give a sum of factored loads with the factors that another document uses together."""
    if not line.is_load:
        return
    places = line.places
    at = {
        text: [k for k, place in enumerate(places.places) if place.tree == Number(text)]
        for text in (DEAD, LIVE)
    }
    if not at[DEAD] or not at[LIVE]:
        return
    for dead, live, source in LOAD_PAIRS:
        new = dict.fromkeys(at[DEAD], (dead, 0.0)) | dict.fromkeys(at[LIVE], (live, 0.0))
        value, half = places.with_places(new)
        words = partial(_pair_said, dead, live, source)
        yield Edit("load pair", TOP, value, half, words)


def _pair_said(dead: float, live: float, source: str) -> str:
    return f"the load factors {dead:g} and {live:g} ({source}) in place of {DEAD} and {LIVE}"


def _symbol_of(node: Node) -> str:
    """Return the symbol that a line's formula gives: ``V_cg`` may be made as ``V_c = ...``."""
    return str(node.entry.get("formula", "")).partition("=")[0].strip() or node.symbol


def _service(line: Line) -> Iterator[Edit]:
    """Give a sum of factored loads with every factor left out, and with one put for another."""
    at = [k for k in range(len(line.places.places)) if line.is_load_factor(k)]
    if len(at) > 1:
        yield Edit("service", tuple(at), 1.0, 0.0, lambda: ALL_LEFT_OUT)
    for k in at:
        for other in {line.places.values[j] for j in at} - {line.places.values[k]}:
            words = partial("the load factor {:.4g} in place of {}".format, other, line.text(k))
            yield Edit("load factor", (k,), other, 0.0, words)
