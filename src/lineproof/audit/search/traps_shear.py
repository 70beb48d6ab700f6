"""Traps of shear and torsion: depth, roots, angles, strains, sections, stirrups."""

from __future__ import annotations

import re
from collections.abc import Iterator

from lineproof.audit.data import Severity
from lineproof.audit.graph import Node
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
    roots_of,
    trees,
)
from lineproof.formula.tree import Call, numbers_of, walk

_TRIGONOMETRY = {"sin", "cos", "tan", "cot"}
_TURNS = {180.0, 57.3, 57.296, 0.01745, 0.0174533, 3.14159, 3.1416}
_SHEAR_KEY = re.compile(r"shear-(\d+)-(left|right)(-\d+)?")
_SIMPLIFIED = 0.18
_LARGEST_STRAIN = 0.02
_COARSE = 20.0
_DEEP = 750.0
_CAP = 64.0


def _depth(view: View) -> Iterator[Caught]:
    advice = "Shear goes with d_v, the larger of 0.9 d and 0.72 h."
    for node in view.lines("V_c", "V_rmax", "V_s", "s_max", "x_f"):
        target = view.target(node, "d_v")
        bare = "d" in names(node) and "d_v" not in names(node)
        if bare or (target is not None and target.symbol == "d"):
            d_v = view.stored(view.part(node.part).get("d_v"))
            name = "d" if bare else "d_v"
            value = None if d_v is None else view.compute(node, **{name: d_v})
            what = "the effective depth d stands where d_v belongs"
            yield Caught(node, what, advice, clause="2.3", right=view.right(node, value))
    for node in view.values("d_v"):
        d, h = view.number(node, "d"), view.number(node, "h")
        if d is None or h is None:
            continue
        if not close(view.graph.stored[node.id], max(0.9 * d, 0.72 * h)):
            yield Caught(
                node,
                "is not the larger of 0.9 d and 0.72 h",
                advice,
                clause="2.3",
                right={node.id: max(0.9 * d, 0.72 * h)},
            )


def _roots(view: View) -> Iterator[Caught]:
    for node in view.lines("V_rmax"):
        if "f_c" in roots_of(node):
            yield Caught(
                node,
                "crushing of the web goes with f'c, not with its root",
                "V_r,max = 0.25 φ_c f'c b_w d_v.",
                clause="11.3.3",
            )
    for node in view.lines("V_c"):
        used = names(node)
        if "f_c" in used and "f_c" not in roots_of(node):
            yield Caught(
                node,
                "the root of f'c is forgotten",
                "V_c = φ_c λ β √f'c b_w d_v.",
                Severity.CRITICAL,
                "11.3.4",
            )
        f_c = view.number(node, "f_c")
        if f_c is not None and f_c > _CAP and not has(node, 8.0):
            yield Caught(
                node,
                "the root of f'c is not held at 8 MPa",
                "√f'c ≤ 8 MPa.",
                clause="11.3.4",
                right=_capped(view, node, f_c),
            )
    for node in view.graph:
        limit = has(node, 0.125) and "b_w" in names(node)
        if limit and ("f_c" in roots_of(node) or "lambda_" not in names(node)):
            yield Caught(
                node,
                "the limit that halves the spacing is not 0.125 λ φ_c f'c",
                "0.125 λ φ_c f'c b_w d_v, with f'c itself.",
                clause="11.3.8.3",
            )


def _capped(view: View, node: Node, f_c: float) -> dict[str, float]:
    return {node.id: view.graph.stored[node.id] * (_CAP / f_c) ** 0.5}


def _angles(view: View) -> Iterator[Caught]:
    for node in view.graph:
        for each in (each for tree in trees(node) for each in walk(tree)):
            if isinstance(each, Call) and _turned(each):
                yield Caught(
                    node,
                    "an angle in degrees is turned into radians once more",
                    "The functions take degrees, as a calculator set to them.",
                    clause="11.3.6",
                )
    for node in view.values("eps_x"):
        if abs(view.graph.stored[node.id]) > _LARGEST_STRAIN:
            yield Caught(
                node,
                "a strain of this size looks like thousandths",
                "ε_x = 0.85 × 10⁻³ is 0.00085.",
                clause="11.3.6.4",
            )
    for node in view.lines("eps_x", "F_lt", "F_lc"):
        if {"M_f", "V_f"} <= names(node) and numbers(node) & {1000.0, 1e6, 0.001, 1e-6}:
            yield Caught(
                node,
                "a factor of units stands between moment and shear",
                "Units are carried by the program: leave the factor out.",
                clause="11.3.6.4",
            )


def _turned(call: Call) -> bool:
    """Tell whether a function of an angle gets one that is turned between degrees and radians."""
    inside = {float(text) for arg in call.args for text in numbers_of(arg)}
    return call.function in _TRIGONOMETRY and bool(inside & _TURNS)


def _simplified(view: View) -> Iterator[Caught]:
    for node in view.lines("V_c"):
        beta = view.number(node, "beta")
        if beta is None or not close(beta, _SIMPLIFIED):
            continue
        part = view.part(node.part)
        A_v, A_vmin = view.number(node, "A_v"), view.stored(part.get("A_vmin"))
        shown = A_vmin is not None or any(True for _ in view.values("A_vmin"))
        if not shown or (A_v is not None and A_vmin is not None and A_v < A_vmin):
            yield Caught(
                node,
                "β = 0.18 is used without the minimum of stirrups",
                "Below the minimum β is 230/(1000 + s_ze).",
                clause="11.3.6.3",
            )
        f_y = view.number(node, "f_y")
        if f_y is not None and f_y > 400 and view.reaches_check(node):  # noqa: PLR2004 - 11.3.6.3
            yield Caught(
                node,
                "the simplified method is used with bars above 400 MPa",
                "Use the general method.",
                clause="11.3.6.3",
            )
    for node in view.lines("beta"):
        a_max = view.number(node, "a_max")
        fine = a_max is not None and a_max < _COARSE
        if fine and has(node, 230.0) and "d_v" in names(node):
            yield Caught(
                node,
                "230/(1000 + d_v) is used with an aggregate below 20 mm",
                "Take s_ze in the place of d_v.",
                clause="11.3.6.3",
            )


def _no_stirrups(view: View) -> Iterator[Caught]:
    for node in view.lines("V_r"):
        h = view.number(node, "h")
        plain = node.tree is not None and is_name(node.tree, "V_c")
        if plain and h is not None and h > _DEEP:
            yield Caught(
                node,
                "a beam deeper than 750 mm stands without stirrups",
                "Minimum stirrups are needed where h > 750 mm.",
                Severity.CRITICAL,
                "11.2.8.1",
            )
    for node in view.criteria():
        if names(node) == {"V_f", "V_c"} and numbers(node) & {0.5, 2.0}:
            yield Caught(
                node,
                "half of V_c is the limit of another standard",
                "Stirrups are needed where V_f > V_c.",
                Severity.MINOR,
                "11.2.8.1",
            )


def _strain_bars(view: View) -> Iterator[Caught]:
    # With the restraint assumed the top is in tension, whatever is in the case of the section.
    restrained = {node.part for node in view.lines("V_fr")}
    for node in view.lines("eps_x"):
        bars = view.target(node, "A_s")
        if bars is None or node.part in restrained:
            continue
        if bars.symbol == "A_sp" or "A_sp" in names(bars):
            yield Caught(
                node,
                "bars on the face in compression are counted",
                "Only bars on the face in tension count.",
                clause="11.3.6.4",
            )
        at_support = _SHEAR_KEY.fullmatch(node.part) is not None
        if at_support and bars.part.startswith(("sag-", "hog-")):
            yield Caught(
                node,
                "all bars of the section count, developed or not",
                "Reduce the area of a bar by the length to its end over ℓ_d.",
                Severity.MINOR,
                "11.3.6.4",
            )


def _critical_section(view: View) -> Iterator[Caught]:
    for node in view.lines("x_f"):
        used = names(node)
        if "d_v" not in used and "d" not in used:
            continue
        if "b_sn" not in used:
            yield Caught(
                node,
                "the section is taken from the axis of the support, not its face",
                "d_v counts from the face.",
                Severity.MINOR,
                "11.3.2",
            )
        place = _SHEAR_KEY.fullmatch(node.part)
        if place is None:
            continue
        number = int(place.group(1)) + (place.group(2) == "right")
        if view.member.support(number).carrier == "girder":
            yield Caught(
                node,
                "the girder carries the beam from the side: its reaction does not press from below",
                "Take the shear at the face.",
                clause="11.3.2",
            )
        near = view.part(node.part).get("near-point-loads")
        if near is not None and not view.holds(near):
            yield Caught(
                node,
                "a point load stands within d_v of the face",
                "Take the shear at the face.",
                clause="11.3.2",
            )


def _end_bars(view: View) -> Iterator[Remark]:
    """Look for one of the two checks of bottom bars at a simple support without the other."""
    made = {"12.11.3": [], "11.3.9.5": []}  # type: dict[str, list[str]]
    for node in view.criteria():
        clause = str(node.entry["clause"])
        simple = "simple support" in view.titles[node.part] or view.member.flow != "continuous"
        if clause in made and (simple or clause == "11.3.9.5"):
            made[clause].append(node.id)
    for clause, other in (("12.11.3", "11.3.9.5"), ("11.3.9.5", "12.11.3")):
        if made[clause] and not made[other] and not _elsewhere(view, other):
            yield Remark(
                f"The bottom bars at a simple support are checked by {clause}, not by {other}",
                "Both are needed: development where the moment is zero, and the force that shear "
                "brings.",
                clause=other,
                ids=tuple(made[clause]),
            )


def _elsewhere(view: View, clause: str) -> bool:
    return any(str(node.entry["clause"]) == clause for node in view.criteria())


TRAPS = (
    Trap(4, "depth for shear", _depth),
    Trap(5, "root of the strength", _roots),
    Trap(6, "angles, strains, units", _angles),
    Trap(7, "simplified method", _simplified),
    Trap(8, "no stirrups", _no_stirrups),
    Trap(9, "bars in the strain", _strain_bars),
    Trap(10, "critical section", _critical_section),
    Trap(11, "bottom bars at a simple support", _end_bars),
)
