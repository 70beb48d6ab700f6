"""Rules of other standards and earlier editions that are met in hand calculations."""

from __future__ import annotations

from collections.abc import Iterator
from functools import cache

from lineproof.audit.junior.edits import replaced
from lineproof.audit.junior.sample import (
    constant_ratio,
    is_usual,
    points_for,
    power_of_ten,
    sampled,
)
from lineproof.formula import Name, Number, Tree, names_of, parse_line
from lineproof.formula.tree import numbers_of

_FACTORS = frozenset(["phi_c", "phi_s"])
"""Factors that are typed as numbers in code."""

_ROWS = (
    # formula, whose rule it is; MPa and mm throughout. From memory, as a checker knows them.
    ("V_c = 0.2*lambda_*phi_c*sqrt(f_c)*b_w*d", "A23.3-94, simplified method"),
    ("V_c = 0.2*phi_c*sqrt(f_c)*b_w*d", "A23.3-94, simplified method"),
    ("V_c = 0.17*lambda_*sqrt(f_c)*b_w*d", "ACI 318"),
    ("V_c = 0.17*sqrt(f_c)*b_w*d", "ACI 318"),
    ("V_s = A_v*f_y*d/s", "ACI 318, bars at 45 degrees"),
    ("V_s = phi_s*A_v*f_y*d/s", "A23.3-94, bars at 45 degrees"),
    ("a = A_s*f_y/(0.85*f_c*b)", "ACI 318"),
    ("a = A_s*f_y/(0.85*f_c*b_w)", "ACI 318"),
    ("a = phi_s*A_s*f_y/(0.85*phi_c*f_c*b)", "A23.3-84"),
    ("a = phi_s*A_s*f_y/(0.85*phi_c*f_c*b_w)", "A23.3-84"),
    ("M_r = 0.9*A_s*f_y*(d - a/2)", "ACI 318"),
    ("E_c = 5000*sqrt(f_c)", "A23.3-84"),
    ("E_c = 4700*sqrt(f_c)", "ACI 318"),
    ("f_r = 0.62*lambda_*sqrt(f_c)", "ACI 318"),
    ("f_r = 0.62*sqrt(f_c)", "ACI 318"),
    ("f_rd = f_r", "A23.3-04 and earlier for beams: the modulus of rupture not halved"),
    ("beta_1 = 0.85 - 0.05*(f_c - 28)/7", "ACI 318"),
    ("A_smin = 1.4*b_w*d/f_y", "ACI 318 and A23.3-84"),
    ("A_smin = 0.25*sqrt(f_c)*b_w*d/f_y", "ACI 318"),
    ("A_smin = 0.002*b_w*h", "7.8.1, for slabs"),
    ("A_smin = max(0.25*sqrt(f_c), 1.4)*b_w*d/f_y", "ACI 318"),
    ("A_vmin = 0.35*b_w*s/f_y", "A23.3-84 and ACI 318"),
    ("s_max = d/2", "ACI 318"),
    ("s_max = min(d/2, 600)", "ACI 318"),
    ("w_f2 = 1.2*w_D + 1.6*w_L", "ASCE 7"),
    ("w_f2 = 1.4*w_D + 1.7*w_L", "ACI 318-99 and earlier"),
    ("w_f2 = 1.25*w_D + 1.5*w_L + 0.5*w_S", "NBC 2005 and 2010, companion loads"),
    ("w_f3 = 1.25*w_D + 1.5*w_S + 0.5*w_L", "NBC 2005 and 2010, companion loads"),
    ("w_f = 1.2*w_D + 1.6*w_L", "ASCE 7"),
    ("w_f = 1.4*w_D + 1.7*w_L", "ACI 318-99 and earlier"),
)


@cache
def _rules() -> dict[str, tuple[tuple[Tree, str, str], ...]]:
    found: dict[str, tuple[tuple[Tree, str, str], ...]] = {}
    for text, whose in _ROWS:
        symbol, tree = parse_line(text)
        found[symbol] = (*found.get(symbol, ()), (tree, text, whose))
    return found


def rules_of(symbol: str) -> tuple[tuple[Tree, str, str], ...]:
    """Return the rules for a symbol: tree, text, and whose it is."""
    return _rules().get(symbol, ())


def foreign_rule(symbol: str, tree: Tree, *, scales: bool = False) -> str:
    """Return whose rule a formula is, if it is one of those known here, else "".

    A factor may be typed as a number, and b be the width of the web; with ``scales`` a power of ten
    is a conversion of units.
    """
    for rule, _, whose in rules_of(symbol):
        wanted = set(names_of(rule))
        for form in _forms(tree, wanted):
            if not wanted or set(names_of(form)) != wanted:
                continue
            points = points_for(wanted)
            factor = constant_ratio(sampled(form, points), sampled(rule, points))
            power = None if factor is None else power_of_ten(factor)
            if power == 0 or (scales and power is not None):
                return whose
    return ""


def _forms(tree: Tree, wanted: set[str]) -> Iterator[Tree]:
    """Give a formula as written, and with the names of a rule for what may stand for them."""
    if "b" in names_of(tree) and "b" not in wanted and "b_w" in wanted:
        tree = replaced(tree, {Name("b"): Name("b_w")})
    yield tree
    missing = wanted - set(names_of(tree))
    if len(missing) == 1 and missing <= _FACTORS:
        (name,) = missing
        for text in numbers_of(tree):
            if is_usual(name, float(text)):
                yield replaced(tree, {Number(text): Name(name)})
