"""Traps of the section: widths, flanges, depths, resistance factors, yield."""

from __future__ import annotations

import re
from collections.abc import Iterator

from lineproof.audit.data import Severity
from lineproof.audit.graph import Node, evaluated
from lineproof.audit.search.traps_view import (
    Caught,
    Remark,
    Trap,
    View,
    close,
    has,
    is_name,
    names,
    numbers,
    terms,
)
from lineproof.formula.tree import names_of
from lineproof.record.entry import GIVEN, LINE

_WEB_AT_SUPPORT = "In negative moment the web is in compression: take b_w."
_FLANGE_AT_MIDSPAN = "In the span the flange is in compression: take b_f."
_MEMBER_FACTOR = re.compile(r"phi(_[a-bd-rt-z]\w*)?")
_SCALE = 1.01
_FLANGE_FACTORS = {"T": 2.5, "L": 1.5}
_SIDES = {"T": 2.0, "L": 1.0}


def _flange_at_support(view: View) -> Iterator[Caught]:
    for node in view.lines("a", "a_r", "A_sr", "M_r", "M_rf", "C_c", "kd", "I_cr"):
        if not view.over_support(node):
            continue
        for name in ("b", "b_f"):
            target = view.target(node, name)
            if target is not None and target.symbol == "b_f":
                b_w = view.number(node, "b_w")
                value = None if b_w is None else view.compute(node, **{name: b_w})
                what = "the width of the flange is used in negative moment"
                yield Caught(
                    node, what, _WEB_AT_SUPPORT, clause="10.3.3", right=view.right(node, value)
                )


def _web_at_midspan(view: View) -> Iterator[Caught]:
    """Look at stiffness only: there a flange left out is no longer on the safe side of anything."""
    if not view.is_one_member or next(view.values("b_f"), None) is None:
        return
    for node in view.lines("kd", "I_cr"):
        target = view.target(node, "b")
        at_midspan = "midspan" in node.title.lower() and not view.over_support(node)
        if at_midspan and target is not None and target.symbol == "b_w":
            what = "the cracked section at midspan is taken without its flange"
            yield Caught(node, what, _FLANGE_AT_MIDSPAN, clause="9.8.2.3")
    for node in view.lines("I_e"):
        gross = view.target(node, "I_g")
        computed = gross is not None and gross.kind == LINE
        if "M_crd" in node.args and gross is not None and computed and "b_f" not in names(gross):
            what = "the gross section at midspan is taken without its flange"
            yield Caught(node, what, _FLANGE_AT_MIDSPAN, clause="9.8.2.3")


def _minimum_steel(view: View) -> Iterator[Caught]:
    clause = "10.5.1.2"
    for node in view.lines("A_smin"):
        used = names(node)
        if "d" in used and "h" not in used:
            h = view.number(node, "h")
            value = None if h is None else view.compute(node, d=h)
            yield Caught(
                node,
                "the effective depth stands for the overall depth",
                "The formula has h.",
                clause=clause,
                right=view.right(node, value),
            )
        if numbers(node) & {0.25, 1.4}:
            yield Caught(
                node,
                "coefficients 0.25 or 1.4 are not those of A23.3",
                "Take 0.2√f'c b_t h/f_y.",
                clause=clause,
            )
        if "b_w" in used and "b_t" not in used and view.over_support(node) and _slab(view):
            yield Caught(
                node,
                "the flange in tension is left out of the width",
                _tension_width(view),
                clause=clause,
            )


def _width_of_tension(view: View) -> Iterator[Caught]:
    factor = _FLANGE_FACTORS.get(view.member.shape)
    if factor is None:
        return
    for node in view.values("b_t"):
        b_w, b_f = (view.number(node, symbol) for symbol in ("b_w", "b_f"))
        if b_w is None or b_f is None:
            continue
        value = view.graph.stored[node.id]
        right = min(b_f, factor * b_w) if view.over_support(node) else b_w
        if not close(value, right):
            yield Caught(
                node,
                "is not the width of the zone in tension here",
                _tension_width(view),
                clause="10.5.1.2",
                right={node.id: right},
            )


def _tension_width(view: View) -> str:
    factor = _FLANGE_FACTORS.get(view.member.shape, 2.5)
    return f"With the flange in tension b_t is the lesser of b_f and {factor:g} b_w, else b_w."


def _slab(view: View) -> bool:
    return next(view.values("h_f"), None) is not None


def _overhang(view: View) -> Iterator[Caught]:
    shape, flow = view.member.shape, view.member.flow
    if shape not in _SIDES or flow not in ("single", "continuous"):
        return
    turns = all(support.turns for support in view.member.carrying())
    simple = flow == "single" or (view.member.spans == 1 and turns)
    span = 12.0 if shape == "L" else 5.0 if simple else 10.0
    depth = 6.0 if shape == "L" else 12.0
    wanted = {"l": 1 / span, "h_f": depth, "l_w": 0.5}
    for node in view.lines("b_o"):
        found = _shares(view, node)
        for name, share in wanted.items():
            if name not in found:
                yield _overhang_caught(node, f"the limit by {name} is left out")
            elif not close(found[name], share):
                said = f"{found[name]:.4g} {name} stands where {share:.4g} {name} belongs"
                yield _overhang_caught(node, said)


def _shares(view: View, node: Node) -> dict[str, float]:
    """Return what each limit of the overhang takes of the one length it names."""
    found = {}
    values = view.graph.named(node, view.graph.stored)
    for term in terms(node.tree) if node.tree is not None else ():
        used = names_of(term)
        if len(used) == 1 and values[used[0]]:
            found[used[0]] = evaluated(term, values) / values[used[0]]
    return found


def _overhang_caught(node: Node, what: str) -> Caught:
    advice = "T: l/10, of a simple span l/5, and 12 h_f; L: l/12 and 6 h_f; both: l_w/2."
    return Caught(node, what, advice, clause="10.3.3")


def _overhang_counted(view: View) -> Iterator[Caught]:
    sides = _SIDES.get(view.member.shape)
    for node in view.lines("b_f"):
        b_w, b_o = (view.stored(view.target(node, name)) for name in ("b_w", "b_o"))
        if sides is None or b_w is None or not b_o:
            continue
        if not close(view.graph.stored[node.id], b_w + sides * b_o):
            yield Caught(
                node,
                f"the overhang is not counted {sides:g} times",
                "T: twice; L: once.",
                clause="10.3.3",
                right={node.id: b_w + sides * b_o},
            )


def _factors(view: View) -> Iterator[Caught]:
    """Scale φ_c and φ_s together: a factored resistance follows them once."""
    factors = {node.id: view.graph.stored[node.id] for node in view.values("phi_c", "phi_s")}
    before = view.graph.worked(factors).values
    after = view.graph.worked({i: value * _SCALE for i, value in factors.items()}).values
    for node in {node.id: node for node in _resistances(view)}.values():
        above = view.above(node)
        if _member_factor(node, above):
            what = "a factor of the member stands beside φ_c and φ_s"
            advice = "φ_c and φ_s are factors of the materials; A23.3 has no other."
            yield Caught(node, what, advice, clause="8.4")
        ratio = after[node.id] / before[node.id] if before[node.id] else _SCALE
        if close(ratio, _SCALE**2, 1e-4) and "a_t" not in {other.symbol for other in above}:
            what = "the resistance factors are applied twice"
            yield Caught(node, what, "φ_c and φ_s belong to the materials, once.", clause="8.4")
        if close(ratio, 1.0, 1e-4) and not has(node, 0.65, 0.85):
            what = "no resistance factor stands in it: a nominal resistance"
            advice = "Compare the factored resistance with M_f or V_f."
            yield Caught(node, what, advice, Severity.CRITICAL, "8.4")


def _resistances(view: View) -> Iterator[Node]:
    """Give the computed resistances with which factored moments and shears are compared."""
    for check in view.checks():
        if check.sides is None or not names_of(check.sides[0]):
            continue
        left, _, right = check.sides
        if names_of(left)[0][:3] in ("M_f", "V_f") and names_of(right):
            target = view.target(check, names_of(right)[0])
            if target is not None and target.kind == LINE:
                yield target


def _member_factor(node: Node, above: list[Node]) -> bool:
    typed = bool(numbers(node) & {0.9, 0.75}) and bool(names(node) & {"phi_c", "phi_s"})
    named = any(_MEMBER_FACTOR.fullmatch(other.symbol) for other in above)
    return named or typed


def _yield_limit(view: View) -> Iterator[Caught | Remark]:
    pair = str(view.record.data["codes"].get("pair", ""))
    old = pair == "NBC 2015 + A23.3-14"
    for node in view.values("c_d"):
        f_y = view.number(node, "f_y")
        if f_y is None or (node.kind == GIVEN and not old):
            continue
        if not close(view.graph.stored[node.id], 700 / (700 + f_y)):
            yield Caught(
                node,
                "the limit of c/d is not that of this steel",
                "c/d ≤ 700/(700 + f_y).",
                clause="10.5.2",
                right={node.id: 700 / (700 + f_y)},
            )
        told = {row["clause"] for row in view.record.data.get("confirm", [])}
        if pair and not old and "10.5.2" not in told:
            yield Caught(
                node,
                "the limit of A23.3-14 is used, which later editions changed",
                "Confirm clause 10.5.2 in the office's copy of the standard.",
                clause="10.5.2",
            )


def _balanced_tee(view: View) -> Iterator[Caught]:
    for node in view.lines("C_b"):
        b, a_b, h_f = view.target(node, "b"), view.number(node, "a_b"), view.number(node, "h_f")
        if b is None or a_b is None or h_f is None or "h_f" in names(node):
            continue
        if b.symbol == "b_f" and a_b > h_f:
            yield Caught(
                node,
                "the balanced block reaches below the flange, the section is taken as a rectangle",
                "Count flange and web.",
                clause="10.1.7",
            )


def _compression_bars(view: View) -> Iterator[Caught]:
    advice = "Take f's from the strain: E_s ε_cu (c − d')/c, at most f_y."
    for node in view.values("f_sp"):
        at = {name: view.number(node, name) for name in ("c", "d_p", "E_s", "eps_cu", "f_y")}
        c, d_p, E_s, eps_cu, f_y = (at[name] for name in ("c", "d_p", "E_s", "eps_cu", "f_y"))
        if not c or d_p is None or E_s is None or eps_cu is None or f_y is None:
            continue
        stress = min(f_y, E_s * eps_cu * (c - d_p) / c)
        if view.graph.stored[node.id] > stress * 1.0001:
            yield Caught(
                node,
                "the bars in compression do not yield at this depth of the neutral axis",
                advice,
                clause="10.1.2",
                right={node.id: stress},
            )
    for node in view.lines("C_s"):
        if "f_y" in names(node) and "f_sp" not in names(node) and not view.part(node.part).get("c"):
            yield Caught(
                node, "yield of the bars in compression is assumed", advice, clause="10.1.2"
            )
    forces = list(view.lines("C_s"))
    if view.is_one_member and len({"alpha_1" in names(node) for node in forces}) > 1:
        node = next(node for node in forces if "alpha_1" not in names(node))
        yield Caught(
            node,
            "the concrete that the bars displace is taken off elsewhere, not here",
            "Treat it alike in all lines.",
            Severity.MINOR,
            "10.1",
        )


def _two_layers(view: View) -> Iterator[Caught]:
    for node in view.lines("M_r", "a_r", "M_rf", "d_v", "kd", "I_cr", "d"):
        part = view.part(node.part)
        second = part.get("A_s2") or part.get("d_2")
        target = view.target(node, "d")
        if second is not None and target is not None and target.symbol == "d_1":
            d = view.stored(part.get("d"))
            value = None if d is None else view.compute(node, d=d)
            yield Caught(
                node,
                "the depth of the first layer stands for that of both",
                "d goes to the centroid of all bars.",
                clause="2.3",
                right=view.right(node, value),
            )


def _clear_spacing(view: View) -> Iterator[Caught]:
    for node in view.values("s_min", "s_l"):
        d_b, a_max = (view.number(node, symbol) for symbol in ("d_b", "a_max"))
        least = max(30.0, 1.4 * (d_b or 0.0), 1.4 * (a_max or 0.0))
        if view.graph.stored[node.id] < least * (1 - 1e-9):
            yield Caught(
                node,
                "the least clear distance is too small",
                "It is the largest of 1.4 d_b, 1.4 a_max and 30 mm.",
                clause="A23.1 6.6.5.2",
                right={node.id: least},
            )


def _nominal_names(view: View) -> Iterator[Caught]:
    for check in view.checks():
        if check.sides is not None and any(is_name(check.sides[2], n) for n in ("M_n", "V_n")):
            yield Caught(
                check,
                "a nominal resistance is compared with a factored force",
                "Compare M_r or V_r.",
                Severity.CRITICAL,
                "8.1.3",
            )


TRAPS = (
    Trap(1, "width of the flange in negative moment", _flange_at_support),
    Trap(1, "web alone for the stiffness at midspan", _web_at_midspan),
    Trap(2, "minimum steel: depth and coefficients", _minimum_steel),
    Trap(2, "minimum steel: width of the zone in tension", _width_of_tension),
    Trap(3, "overhang of the flange", _overhang),
    Trap(3, "overhang added once or twice", _overhang_counted),
    Trap(12, "resistance factors", _factors),
    Trap(12, "nominal resistance", _nominal_names),
    Trap(13, "limit of c/d", _yield_limit),
    Trap(13, "balanced steel of a T section", _balanced_tee),
    Trap(14, "bars in compression", _compression_bars),
    Trap(24, "depth with two layers", _two_layers),
    Trap(24, "clear distance of bars", _clear_spacing),
)
