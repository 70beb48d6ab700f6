"""Rules of thumb: short cuts of hand calculations that no standard gives, and what they make."""

from __future__ import annotations

import math
from collections.abc import Iterator
from typing import NamedTuple

from lineproof.audit.slips.edits import TOP, Edit, Line


class _Rule(NamedTuple):
    """A short cut: its words, its factor, and the quantities multiplied and divided by."""

    words: str
    factor: float
    over: tuple[str, ...]
    under: tuple[str, ...] = ()


_RULES = {
    "M_r": _Rule("a lever arm of 0.9d in place of d - a/2", 0.9, ("phi_s", "A_s", "f_y", "d")),
    "A_sr": _Rule(
        "M_f/(phi_s*f_y*0.9*d), a lever arm of 0.9d", 1 / 0.9, ("M_f",), ("phi_s", "f_y", "d")
    ),
}
_FACE = "the moment at the axis less V*b/3, b the width of the support, for that at its face"
_OF_HALF = 2 / 3
"""A third of the width of a support, in halves of it: x_f is half the width."""


def rules_of_thumb(line: Line) -> Iterator[Edit]:
    """Give what short cuts make of a line: steel and resistance, moments at faces of supports."""
    names = _names(line)
    rule = _RULES.get(line.scope.stems[line.node.id])
    if rule is not None and all(name in names for name in (*rule.over, *rule.under)):
        over = [line.pairs[names[name]] for name in rule.over]
        under = [line.pairs[names[name]] for name in rule.under]
        if all(value for value, _ in (*over, *under)):
            value = rule.factor * math.prod(v for v, _ in over) / math.prod(v for v, _ in under)
            half = abs(value) * sum(each / abs(v) for v, each in (*over, *under))
            yield Edit("thumb", TOP, value, half, lambda: rule.words)
    if line.node.symbol == "M_f" and line.node.part.startswith("hog"):
        yield from _at_a_third(line, names)


def _names(line: Line) -> dict[str, str]:
    """Return the quantities of a line and of its part by name; those of the line come first."""
    valued = line.scope.units
    part = {n.symbol: n.id for n in line.scope.by_part[line.node.part] if n.id in valued}
    return part | {name: i for name, i in line.node.args.items() if i in valued}


def _at_a_third(line: Line, names: dict[str, str]) -> Iterator[Edit]:
    if not {"M_sn", "V_sn", "x_f"} <= set(names):
        return
    (moment, of_moment), (shear, of_shear), (x, _) = (
        line.pairs[names[name]] for name in ("M_sn", "V_sn", "x_f")
    )
    value = abs(moment) - shear * x * _OF_HALF
    half = of_moment + of_shear * x * _OF_HALF
    yield Edit("thumb", TOP, value, half, lambda: _FACE)
