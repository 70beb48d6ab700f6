"""Whole rules put for a line: short cuts of hand calculations, the web alone, other standards."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from functools import cache, partial
from typing import NamedTuple

from lineproof.audit.graph import evaluated
from lineproof.audit.junior.foreign import rules_of
from lineproof.audit.slips.edits import TOP, Edit, Line
from lineproof.audit.slips.tree import Pair
from lineproof.formula import Tree, names_of, parse_line
from lineproof.formula.compiled import NOT_COMPUTED


class _Rule(NamedTuple):
    """What is put for a line's own formula: family, tree, and how it is said."""

    family: str
    tree: Tree
    words: str


_WEB = "the web alone for the whole section"
_ROWS = (
    # family, rule, how it is said behind its text; no words for the text: it says all
    ("thumb", "M_r = 0.9*phi_s*A_s*f_y*d", "", "a lever arm of 0.9d in place of d - a/2"),
    ("thumb", "A_sr = M_f/(phi_s*f_y*0.9*d)", "M_f/(phi_s*f_y*0.9*d)", "a lever arm of 0.9d"),
    ("web", "I_g = b_w*h**3/12", "b_w*h**3/12", _WEB),
    ("web", "M_cr = f_r*b_w*h**2/6", "f_r*b_w*h**2/6", _WEB),
    ("web", "M_crn = f_r*b_w*h**2/6", "f_r*b_w*h**2/6", _WEB),
    ("web", "M_crd = f_rd*b_w*h**2/6", "f_rd*b_w*h**2/6", _WEB),
    ("web", "y_b = h/2", "h/2", _WEB),
    ("web", "I_g = b_w*h**3/12 + (b_f - b_w)*h_f**3/12", "b_w*h**3/12 + (b_f - b_w)*h_f**3/12",
     "web and flange about their own axes, their distances from the centroid forgotten"),
    ("simple span", "delta_i = 5*w_s*l**4/(384*E_c*I_ea)", "5*w_s*l**4/(384*E_c*I_ea)",
     "a simple span"),
    ("simple span", "delta_i = 5*w_s*l**4/(384*E_c*I_g)", "5*w_s*l**4/(384*E_c*I_g)",
     "not cracked"),
    ("thumb", "delta_t = zeta_s*delta_DL", "zeta_s*delta_DL",
     "the deflection under all loads taken as sustained"),
    ("thumb", "delta_at = (zeta_s - zeta_sa)*delta_DL", "(zeta_s - zeta_sa)*delta_DL",
     "the deflection under all loads taken as sustained"),
)  # fmt: skip
_FACE = "the moment at the axis less V*b/3, b the width of the support, for that at its face"
_OF_HALF = 2 / 3
"""A third of the width of a support, in halves of it: x_f is half the width."""


@cache
def _rules(symbol: str) -> tuple[_Rule, ...]:
    """Return the rules that are put for a symbol's own formula."""
    known = [
        _Rule(family, tree, ", ".join(filter(None, (text, why))))
        for family, row, text, why in _ROWS
        for own, tree in [parse_line(row)]
        if own == symbol
    ]
    known += [_Rule("rule", tree, f"{text} ({whose})") for tree, text, whose in rules_of(symbol)]
    return tuple(known)


def rules_of_thumb(line: Line) -> Iterator[Edit]:
    """Give what other rules than its own make of a line, where all that they need is about."""
    names = _names(line)
    made_by = str(line.node.entry.get("formula", "")).partition("=")[0].strip()
    for symbol in dict.fromkeys((line.scope.stems[line.node.id], made_by)):
        for rule in _rules(symbol):
            made = _worked(line, rule.tree, names)
            if made is not None:
                yield Edit(rule.family, TOP, *made, partial(str, rule.words))
    if line.node.symbol == "M_f" and line.node.part.startswith("hog"):
        yield from _at_a_third(line, names)


def _worked(line: Line, tree: Tree, names: Mapping[str, str]) -> Pair | None:
    """Return what a rule gives and half its width; None where something lacks or is nothing."""
    if not set(names_of(tree)) <= names.keys():
        return None
    pairs = {name: line.pairs[names[name]] for name in names_of(tree)}
    values = {name: value for name, (value, _) in pairs.items()}
    if not all(values.values()):
        return None
    try:
        value = evaluated(tree, values)
        moved = [
            abs(evaluated(tree, values | {name: at + half}) - value)
            for name, (at, half) in pairs.items()
            if half
        ]
    except NOT_COMPUTED:
        return None
    return value, sum(moved)


def _names(line: Line) -> dict[str, str]:
    """Return quantities by name: those of the line, of its part, and those used in its part."""
    valued, part = line.scope.units, line.scope.by_part[line.node.part]
    used = {name: i for n in reversed(part) for name, i in n.args.items() if i in valued}
    own = {n.symbol: n.id for n in part if n.id in valued}
    return used | own | {name: i for name, i in line.node.args.items() if i in valued}


def _at_a_third(line: Line, names: dict[str, str]) -> Iterator[Edit]:
    if not {"M_sn", "V_sn", "x_f"} <= set(names):
        return
    (moment, of_moment), (shear, of_shear), (x, _) = (
        line.pairs[names[name]] for name in ("M_sn", "V_sn", "x_f")
    )
    value = abs(moment) - shear * x * _OF_HALF
    half = of_moment + of_shear * x * _OF_HALF
    yield Edit("thumb", TOP, value, half, lambda: _FACE)
