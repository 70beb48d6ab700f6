"""Whole rules put for a line: short cuts of hand calculations, the web alone, other standards."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from functools import cache, partial
from typing import NamedTuple

from lineproof.audit.graph import evaluated
from lineproof.audit.junior.foreign import rules_of
from lineproof.audit.slips.edits import TOP, Edit, Line, words_of
from lineproof.audit.slips.tree import Pair
from lineproof.formula import Name, Tree, names_of, parse_line
from lineproof.formula.compiled import NOT_COMPUTED
from lineproof.standards.nbc.combinations import DEAD


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
    ("thumb", "d = 0.9*h", "0.9*h", "a depth assumed and not worked out"),
    ("thumb", "d = h - 60", "h - 60", "a depth assumed and not worked out"),
    ("thumb", "d = h - 65", "h - 65", "a depth assumed and not worked out"),
    ("thumb", "d = h - 70", "h - 70", "a depth assumed and not worked out"),
    ("thumb", "d_v = d - a/2", "d - a/2", "the lever arm of flexure"),
    ("thumb", "d_v = 0.72*d", "0.72*d", "the factor of h put to d"),
    ("thumb", "d_v = 0.9*h", "0.9*h", "the factor of d put to h"),
    ("thumb", "w_sl = gamma_w*h_f*(b_tr - b_w)", "gamma_w*h_f*(b_tr - b_w)",
     "the slab on the clear width alone"),
    ("thumb", "w_fl = q_fl*(b_tr - b_w)", "q_fl*(b_tr - b_w)",
     "the floor on the clear width alone"),
    ("centreline", "T_f = t_f*l/2", "t_f*l/2", "the torsion at the axis of the support"),
    ("centreline", "T_f = t_f*(l/2 - x_n)", "t_f*(l/2 - x_n)",
     "the ends held at the axes of the supports"),
    ("thumb", "A_oh = (b_w - 2*c_c)*(h - 2*c_c)", "(b_w - 2*c_c)*(h - 2*c_c)",
     "to the outside of the stirrup"),
    ("thumb", "p_h = 2*(b_w - 2*c_c + h - 2*c_c)", "2*(b_w - 2*c_c + h - 2*c_c)",
     "to the outside of the stirrup"),
    ("thumb", "delta_t = zeta_s*delta_DL", "zeta_s*delta_DL",
     "the deflection under all loads taken as sustained"),
    ("thumb", "delta_at = (zeta_s - zeta_sa)*delta_DL", "(zeta_s - zeta_sa)*delta_DL",
     "the deflection under all loads taken as sustained"),
)  # fmt: skip
_FACE = "the moment at the axis less V*b/3, b the width of the support, for that at its face"
_NO_MOMENTS = "the moments at the supports left out, as of simple spans"
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
    made_by = str(line.node.entry.get("formula", "")).partition("=")[0].strip()
    symbols = dict.fromkeys((line.scope.stems[line.node.id], made_by))
    rules = [rule for symbol in symbols for rule in _rules(symbol)]
    at_face = line.node.symbol == "M_f" and line.node.part.startswith("hog")
    if rules or at_face or "w_f" in symbols:
        names = _names(line)
        for rule in rules:
            made = _worked(line, rule.tree, names)
            if made is not None:
                yield Edit(rule.family, TOP, *made, partial(str, rule.words))
        if at_face:
            yield from _at_a_third(line, names)
        if "w_f" in symbols:
            yield from _weight_again(line, names)
    if line.is_load:
        yield from _simple_supports(line)
        yield from _shared(line)


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
    """Return quantities by name: of the line, of its part, used in it, or beside an argument."""
    valued, part = line.scope.units, line.scope.by_part[line.node.part]
    beside = dict[str, str]()
    for target in reversed(
        tuple(line.node.args.values())
    ):  # what stands with an argument, and is used so
        there = line.scope.by_part[line.scope.graph[target].part]
        beside |= {name: i for n in reversed(there) for name, i in n.args.items() if i in valued}
        beside |= {n.symbol: n.id for n in there if n.id in valued}
    used = {name: i for n in reversed(part) for name, i in n.args.items() if i in valued}
    own = {n.symbol: n.id for n in part if n.id in valued}
    return beside | used | own | {name: i for name, i in line.node.args.items() if i in valued}


def _at_a_third(line: Line, names: dict[str, str]) -> Iterator[Edit]:
    if not {"M_sn", "V_sn", "x_f"} <= set(names):
        return
    (moment, of_moment), (shear, of_shear), (x, _) = (
        line.pairs[names[name]] for name in ("M_sn", "V_sn", "x_f")
    )
    value = abs(moment) - shear * x * _OF_HALF
    half = of_moment + of_shear * x * _OF_HALF
    yield Edit("thumb", TOP, value, half, lambda: _FACE)


def _weight_again(line: Line, names: Mapping[str, str]) -> Iterator[Edit]:
    """Give a factored load to which the weight of the beam is added, which the dead load holds."""
    value, half = line.pair(0)
    for symbol in ("w_wb", "w_bm"):
        if symbol in names:
            weight, of_weight = line.pairs[names[symbol]]
            for factor in (float(DEAD), 1.0):
                words = partial(_again, line, names[symbol], factor)
                yield Edit("thumb", TOP, value + factor * weight, half + of_weight, words)


def _again(line: Line, weight: str, factor: float) -> str:
    times = f"{factor:g} times " if factor != 1 else ""
    return f"{times}{words_of(line.scope, weight)} added again, which the dead load holds"


def _simple_supports(line: Line) -> Iterator[Edit]:
    """Give a reaction or shear from which the moments of the supports are left out, all of them."""
    tree = line.node.tree
    moments = [name for name in line.node.args if name.startswith("M_")]
    if tree is None or not moments or line.node.symbol[0] not in "RV":
        return
    pairs = {name: line.pairs[target] for name, target in line.node.args.items()}
    values = {name: 0.0 if name in moments else value for name, (value, _) in pairs.items()}
    try:
        value = evaluated(tree, values)
    except NOT_COMPUTED:
        return
    half = abs(value) * max((h / abs(v) for v, h in pairs.values() if v), default=0.0)
    yield Edit("simple span", TOP, value, half, lambda: _NO_MOMENTS)


def _shared(line: Line) -> Iterator[Edit]:
    """Give half and twice a load that is taken over from another line."""
    if isinstance(line.node.tree, Name) and line.scope.units[line.node.id] == "N/mm":
        value, half = line.pair(0)
        for factor, why in ((0.5, "half of the load taken"), (2.0, "the load taken twice")):
            yield Edit("tributary", TOP, value * factor, half * factor, partial(str, why))
