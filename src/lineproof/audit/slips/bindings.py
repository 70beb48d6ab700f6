"""Slips that put another value where a quantity stands in a formula or goes into a procedure."""

from __future__ import annotations

from collections.abc import Iterator
from functools import partial

from lineproof.audit.graph import real
from lineproof.audit.slips.edits import SUM, TOP, Edit, Line
from lineproof.audit.slips.values import others_for
from lineproof.formula.compiled import NOT_COMPUTED

ONE_OF_MANY = 0.7
"""A slip at one place of a quantity that stands at several is less likely by so much."""
AT_ONE = frozenset(("pair", "kin", "near", "unit"))
"""Families that are tried at each place of a quantity by itself as well."""
OF_FOUND = frozenset((
    "pair", "mirror", "clear span", "service", "factored", "tributary", "edition", "unit",
    "swapped", "bar count", "legs", "diameter", "bar size",
))  # fmt: skip
"""Families tried in the arguments of a found value, each at the cost of a run."""


def edits_of_bindings(line: Line) -> Iterator[Edit]:
    """Give every edit that puts another value where a quantity stands in a line's formula."""
    for name, target in line.node.args.items():
        at = line.places.uses(name)
        if not at or target not in line.scope.units:
            continue
        ways = [tuple(at)] + ([(k,) for k in at] if len(at) > 1 else [])
        if len(at) > 1 and all(_is_term(line, k) for k in at):
            words = partial("{} left out wherever it stands".format, line.named(name))
            yield Edit("term", tuple(at), 0.0, 0.0, words, swap=(target, ""))
        for other in others_for(line, target, name):
            for places in ways if other.family in AT_ONE else ways[:1]:
                yield other.edit(places, target, ONE_OF_MANY if len(places) < len(at) else 0.0)


def _is_term(line: Line, at: int) -> bool:
    """Tell whether a place is a term of a sum, which may be forgotten."""
    above = line.places.places[at].above
    return above >= 0 and line.places.places[above].operation in SUM


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
            except NOT_COMPUTED:
                continue
            spread = abs(made) * relative
            swap = (target, other.took)
            yield Edit(other.family, TOP, made, spread, other.words, other.far, swap)
