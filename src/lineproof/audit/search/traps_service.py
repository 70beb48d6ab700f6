"""Traps of deflections, cracks and the four distances from a face to a bar."""

from __future__ import annotations

from collections.abc import Iterator

from lineproof.audit.data import Severity
from lineproof.audit.graph import Node
from lineproof.audit.search.traps_view import (
    Caught,
    Trap,
    View,
    close,
    has,
    names,
    trees,
)
from lineproof.formula.tree import names_of
from lineproof.record.entry import GIVEN, LOOKUP

_HALVED = ("M_crd", "M_crdn")
_FULL = ("M_cr", "M_crn")
_FULL_RUPTURE = "the cracking moment is that of the full modulus of rupture"
_ALLOWANCE = 0.6
DISTANCES = {
    "d_c": "the distance to the nearest bar, for cracks",
    "d_cs": "the distance that governs splitting",
    "d_cn": "the distance to the nearest surface",
    "c_c": "the cover of the stirrup",
    "c_b1": "the cover of the bars",
}
"""Four distances that are easily taken for one another, and what each is."""
_WANTED = {
    ("z", "d_c"): ("d_c",),
    ("l_d0", "d_cs"): ("d_cs",),
    ("d_cs", "d_cn"): ("d_cn",),
    ("c_fire", "c_b1"): ("c_b1",),
    ("c_rs", "c_c"): ("c_c",),
    ("c_rb", "c_b1"): ("c_b1",),
}
"""What a name must stand for, by the quantity of the line or the left side of the criterion."""


_RUPTURE = "Deflections: half of f_r (9.8.2.3); minimum steel: f_r (10.5.1.1)."


def _rupture(view: View) -> Iterator[Caught]:
    """Look for the full modulus of rupture in deflections."""
    clause = "9.8.2.3"
    for node in view.lines("f_rd"):
        f_r = view.number(node, "f_r")
        if f_r and view.graph.stored[node.id] > 0.501 * f_r:
            what = "the modulus of rupture is not halved"
            yield Caught(node, what, _RUPTURE, clause=clause, right={node.id: f_r / 2})
    for node in view.lines(*_HALVED):
        target = view.target(node, "f_rd") or view.target(node, "f_r")
        if target is not None and target.symbol == "f_r" and not has(node, 0.5):
            right = {node.id: view.graph.stored[node.id] / 2}
            yield Caught(node, _FULL_RUPTURE, _RUPTURE, clause=clause, right=right)
    for node in view.lines("I_e"):
        for name in _HALVED:
            target = view.target(node, name)
            if target is not None and target.symbol in _FULL:
                value = view.compute(node, **{name: view.graph.stored[target.id] / 2})
                right = view.right(node, value)
                yield Caught(node, _FULL_RUPTURE, _RUPTURE, clause=clause, right=right)


def _halved_elsewhere(view: View) -> Iterator[Caught]:
    """Look for the halved modulus of rupture outside deflections."""
    for node in view.criteria():
        for name in _FULL:
            target = view.target(node, name)
            if target is not None and target.symbol in _HALVED:
                what = "the halved cracking moment of deflections stands for M_cr"
                yield Caught(node, what, _RUPTURE, clause="10.5.1.1")


def _long_term(view: View) -> Iterator[Caught]:
    clause = "9.8.2.5"
    for node in view.lines("zeta_s", "zeta_sa"):
        factors = {name: 0.0 for name in ("S_t", "S_ta") if name in node.args}
        alone = view.compute(node, **factors) if factors else None
        if alone is not None and not close(alone, 1.0):
            yield Caught(
                node,
                "gives the additional deflection, not the total",
                "ζ_s = 1 + S/(1 + 50ρ') multiplies to the total.",
                clause=clause,
                right={node.id: view.graph.stored[node.id] + 1 - alone},
            )
    for node in view.lines("delta_t"):
        yield from _total(view, node)
    for node in view.lines("rho_p"):
        yield from _other_place(view, node)
        b = view.target(node, "b")
        web = "b_w" in names(node) or (b is not None and b.symbol == "b_w")
        if web and next(view.values("b_f"), None) and not view.over_support(node):
            yield Caught(
                node,
                "the width of the web is taken at midspan of a flanged section",
                "ρ' goes with the width in compression.",
                Severity.MINOR,
                clause,
            )


def _other_place(view: View, node: Node) -> Iterator[Caught]:
    target = view.target(node, "A_sp")
    if target is not None and view.over_support(target) != view.over_support(node):
        yield Caught(
            node,
            "the bars in compression are those of another place",
            "ρ' is that at midspan, of a cantilever that at the support.",
            Severity.MINOR,
            "9.8.2.5",
        )


def _total(view: View, node: Node) -> Iterator[Caught]:
    """Put ζ_s = 1 into a total deflection: it must give the immediate one, all loads on."""
    rest = view.part(node.part).get("delta_Lr")
    whole = view.number(node, "delta_DL")
    if whole is None and rest is not None:
        whole = view.stored(view.target(rest, "delta_DL"))
    immediate = view.compute(node, zeta_s=1.0) if "zeta_s" in names(node) else None
    if immediate is None or not whole or close(immediate, whole, 1e-3):
        return
    twice = immediate > whole
    yield Caught(
        node,
        f"the immediate deflection is {'counted twice' if twice else 'in part dropped'}",
        "ζ_s times the sustained part, and the live load that is not sustained once.",
        clause="9.8.2.5",
        right=_less(view, node, immediate - whole),
    )


def _less(view: View, node: Node, by: float) -> dict[str, float]:
    return {node.id: view.graph.stored[node.id] - by}


def _cracks(view: View) -> Iterator[Caught]:
    clause = "10.6.1"
    for node in view.values("d_c", "d_s"):
        c_c, d_bs, d_b = (view.number(node, symbol) for symbol in ("c_c", "d_bs", "d_b"))
        typed = node.kind == GIVEN or "c_c" in names(node)
        if c_c is None or d_bs is None or d_b is None or not typed:
            continue
        right = c_c + d_bs + d_b / 2
        if view.graph.stored[node.id] < right - 0.5:
            short = "" if "d_bs" in names(node) else ": the stirrup is forgotten"
            yield Caught(
                node,
                f"is not the distance to the centre of the bar{short}",
                "Cover, stirrup, half a bar.",
                clause=clause,
                right={node.id: right},
            )
    for node in view.lines("A_e"):
        if not any(name.startswith("n_") for name in names(node)):
            n_z = view.number(node, "n_z")
            value = view.graph.stored[node.id] / n_z if n_z else None
            yield Caught(
                node,
                "the concrete is not divided by the number of bars",
                "A is the concrete around one bar.",
                clause=clause,
                right=view.right(node, value),
            )
    for node in view.criteria():
        stress = node.sides is not None and names_of(node.sides[0]) == ("f_s",)
        if stress and "f_y" in names(node) and has(node, _ALLOWANCE):
            what = "0.6 f_y is what may be taken for the stress, not its limit"
            yield Caught(node, what, "Check z.", Severity.MINOR, clause)


def _distances(view: View) -> Iterator[Caught]:
    for node in view.graph:
        quantity = view.quantity(node) if node.has_value else _left(node)
        for (of, name), wanted in _WANTED.items():
            if of != quantity:
                continue
            for used, target in ((n, view.target(node, n)) for n in _candidates(node, name)):
                other = target is not None and target.symbol not in wanted
                if target is not None and other and target.symbol in DISTANCES:
                    yield _mistaken(view, node, used, target)


def _candidates(node: Node, name: str) -> list[str]:
    """Return the name itself and any other of the distances that the formula names instead."""
    others = [] if name in node.args else [other for other in DISTANCES if other in node.args]
    return [name, *others] if node.args.get(name) or others else []


def _left(node: Node) -> str:
    left = names_of(trees(node)[0]) if trees(node) else ()
    return left[0] if len(left) == 1 else ""


def _mistaken(view: View, node: Node, name: str, target: Node) -> Caught:
    right = view.part(node.part).get(name)
    value = view.stored(right) if right is not None and right.id != target.id else None
    worked = None if value is None or not node.has_value else view.compute(node, **{name: value})
    return Caught(
        node,
        f"{DISTANCES[target.symbol]} stands where another distance belongs",
        "Four distances: to the nearest bar (cracks), to splitting (bond), cover (durability), "
        "cover of the bars (fire).",
        right=view.right(node, worked),
    )


def _bars_of_development(view: View) -> Iterator[Caught]:
    clause = "12.2.4"
    for node in view.values("k_4"):
        d_b = view.number(node, "d_b")
        thin = d_b is not None and d_b < 20  # noqa: PLR2004 - 20M is 19.5 mm
        wanted = 0.8 if thin else 1.0
        if d_b is not None and not close(view.graph.stored[node.id], wanted):
            yield Caught(
                node,
                f"the factor of a bar of {d_b:g} mm is {wanted:g}",
                "0.8 up to 20M, else 1.0.",
                Severity.MINOR if thin else Severity.MAJOR,
                clause,
                {node.id: wanted},
            )
    for node in view.values("k_1"):
        title = view.titles[node.part].lower()
        value, h_u = view.graph.stored[node.id], view.stored(view.part(node.part).get("h_u"))
        deep = h_u is not None and h_u > 300  # noqa: PLR2004 - 12.2.4
        if "top bars" in title and deep and value < 1.3:  # noqa: PLR2004 - 12.2.4
            yield Caught(
                node,
                "the factor 1.3 of top bars is forgotten",
                "1.3 with more than 300 mm of fresh concrete below.",
                clause=clause,
                right={node.id: 1.3},
            )
        if "bottom bars" in title and value > 1.0:
            yield Caught(
                node,
                "bottom bars have the factor of top bars",
                "k_1 = 1.0.",
                Severity.MINOR,
                clause,
                {node.id: 1.0},
            )


def _short_expression(view: View) -> Iterator[Caught]:
    for node in view.lines("l_d0"):
        part = view.part(node.part)
        if not has(node, 0.45):
            continue
        asked = [part.get(key) for key in ("development-cover", "development-spacing")]
        broken = any(test is not None and not view.holds(test) for test in asked)
        bare = not any(True for _ in view.values("A_v", "A_t", "A_tr")) and not any(asked)
        if broken or bare:
            value = view.graph.stored[node.id] * 0.60 / 0.45
            yield Caught(
                node,
                "0.45 is used without the cover, spacing or stirrups that it asks for",
                "Take 0.60, or the general expression.",
                clause="12.2.3",
                right={node.id: value},
            )


def _laps(view: View) -> Iterator[Caught]:
    clause = "12.15.1"
    for node in view.lines("l_s"):
        l_d0 = view.target(node, "l_d0") or view.target(node, "l_d")
        value, part = view.graph.stored[node.id], view.part(node.part)
        excess = l_d0 is not None and "A_sr" in {
            other.symbol for other in (l_d0, *view.above(l_d0))
        }
        if "A_sr" in names(node) or (excess and l_d0 is not None and "A_sr" in l_d0.args):
            yield Caught(
                node,
                "the reduction for more steel than required is used in a lap",
                "Laps take the whole development length.",
                clause=clause,
            )
        length = view.stored(l_d0)
        class_a = [test for key in ("lap-share", "lap-excess") if (test := part.get(key))]
        earned = len(class_a) > 1 and all(map(view.holds, class_a))
        if length is not None and length > 300 and value < 1.299 * length and not earned:  # noqa: PLR2004 - the clause
            yield Caught(
                node,
                "a class A lap stands where class B belongs",
                "Class A: half of the bars, twice the steel; else 1.3 l_d.",
                clause=clause,
                right={node.id: 1.3 * length},
            )
        if value < 300 * (1 - 1e-9):
            yield Caught(
                node,
                "is shorter than 300 mm",
                "At least 300 mm.",
                clause="12.15.1",
                right={node.id: 300.0},
            )


def _typed_area(view: View) -> Iterator[Caught]:
    for node in view.values("A_s"):
        part = view.part(node.part)
        if node.kind in (GIVEN, LOOKUP):
            n_b = view.stored(part.get("n_b") or part.get("n_1"))
            A_b = view.stored(part.get("A_b"))
            if n_b and A_b and not close(view.graph.stored[node.id], n_b * A_b, 0.01):
                yield Caught(
                    node,
                    f"is not the area of {n_b:g} bars of {A_b:g} mm²",
                    "Number of bars times their area.",
                    clause="G30.18",
                    right={node.id: n_b * A_b},
                )


TRAPS = (
    Trap(18, "modulus of rupture", _rupture),
    Trap(18, "halved modulus of rupture", _halved_elsewhere),
    Trap(19, "long-term deflection", _long_term),
    Trap(20, "crack control", _cracks),
    Trap(21, "four distances", _distances),
    Trap(22, "factors of development", _bars_of_development),
    Trap(22, "short expression of development", _short_expression),
    Trap(23, "laps", _laps),
    Trap(31, "bars counted, area typed", _typed_area),
)
