"""Chains of equal (or compared) things: formula, substitution, coherent result."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass
from typing import Any

from lineproof.formula.grammar import parse_criterion, parse_line
from lineproof.formula.notation import Notation
from lineproof.formula.tree import Name, Number, Tree, names_of
from lineproof.typeset.nodes import EQUALS, OPPOSITE, RELATIONS, Math, Sign, row
from lineproof.typeset.plain import plain
from lineproof.typeset.values import number_math, symbol_math, symbol_of, value_math
from lineproof.typeset.visitor import formula_math, substitution_math

Entry = Mapping[str, Any]


@dataclass(frozen=True, slots=True)
class Chain:
    """A left side and the pieces that follow it, each beginning with its relation sign.

    ``lead`` is a word before the chain ("asked").
    """

    head: Math
    pieces: tuple[Math, ...]
    lead: str = ""

    @property
    def plain(self) -> str:
        """Return the chain as one line of plain text."""
        chain = plain(row([self.head, *self.pieces]))
        return f"{self.lead}: {chain}" if self.lead else chain


def line_chain(entry: Entry, notation: Notation) -> Chain:
    """Return symbol = formula = substitution (= coherent result); the result stands apart."""
    tree, printed = parse_line(entry["formula"])[1], entry["printed"]
    symbol = symbol_math(symbol_of(entry["symbol"], notation))
    pieces = [row([EQUALS, formula_math(tree, notation)])]
    coherent = printed.get("coherent")
    if names_of(tree):
        numbers = substitution_math(tree, printed["args"], notation)
        # A substitution that is the result itself ("M = M_f") would only be printed twice.
        if coherent or numbers != number_math(printed["result"]):
            pieces.append(row([EQUALS, numbers]))
    if coherent:
        pieces.append(row([EQUALS, value_math(coherent["result"], coherent["unit"])]))
    return Chain(symbol, tuple(pieces))


def criterion_chains(entry: Entry, notation: Notation) -> tuple[Chain, ...]:
    """Return a criterion as chains that are true as printed.

    Two plain names or numbers give one chain, a = 26.1 mm ≤ h_f = 140 mm. Otherwise three: the
    criterion, the substitution, both values. When the criterion does not hold, the values stand
    with the opposite sign, and the criterion stands first as what was asked for; a plain number
    of it then has its unit, since beside a plain name no substitution follows.
    """
    left, sign, right = parse_criterion(entry["formula"])
    asked = RELATIONS[sign]
    true = asked if entry["holds"] else RELATIONS[OPPOSITE[sign]]
    simple = isinstance(left, Name | Number) and isinstance(right, Name | Number)
    chains = []
    values = _values(entry)
    if not (simple and entry["holds"]):
        first, second = (
            value if simple and isinstance(side, Number) else formula_math(side, notation)
            for side, value in zip((left, right), values, strict=True)
        )
        lead = "" if entry["holds"] else "asked"
        chains.append(Chain(first, (row([asked, second]),), lead))
    if simple:
        return (*chains, _named_values(entry, left, true, right, notation))
    numbers = [
        substitution_math(side, entry["printed"]["args"], notation) for side in (left, right)
    ]
    if numbers != [number_math(entry["printed"][side]) for side in ("left", "right")]:
        chains.append(_compared(numbers[0], true, numbers[1]))
    return (*chains, _compared(values[0], true, values[1]))


def _compared(left: Math, sign: Sign, right: Math) -> Chain:
    return Chain(left, (row([sign, right]),))


def _values(entry: Entry) -> tuple[Math, Math]:
    printed = entry["printed"]
    unit = printed.get("unit", "")
    return value_math(printed["left"], unit), value_math(printed["right"], unit)


def _named_values(entry: Entry, left: Tree, sign: Sign, right: Tree, notation: Notation) -> Chain:
    first, second = _values(entry)
    pieces: list[Math] = []
    head = first
    if isinstance(left, Name):
        head = formula_math(left, notation)
        pieces.append(row([EQUALS, first]))
    if isinstance(right, Name):
        pieces += [row([sign, formula_math(right, notation)]), row([EQUALS, second])]
    else:
        pieces.append(row([sign, second]))
    return Chain(head, tuple(pieces))
