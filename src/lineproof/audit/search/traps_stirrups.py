"""Traps of low density, torsion, rules of other standards, and the legs of stirrups."""

from __future__ import annotations

from collections.abc import Iterator, Mapping

from lineproof.audit.data import Severity
from lineproof.audit.search.stirrup_rows import first_column
from lineproof.audit.search.traps_view import (
    Caught,
    Remark,
    Trap,
    View,
    close,
    has,
    names,
    numbers,
    roots_of,
    terms,
)
from lineproof.formula.tree import names_of

_ACI = {0.166, 0.167, 0.17, 0.16, 0.33, 0.062, 0.083}


def _density(view: View) -> Iterator[Caught]:
    for node in view.lines("V_c", "f_r", "T_cr", "T_crf"):
        if "lambda_" in names(node) or not roots_of(node):
            continue
        lambda_ = view.number(node, "lambda_")
        light = lambda_ is not None and lambda_ < 1
        value = view.graph.stored[node.id] * (lambda_ or 1.0)
        yield Caught(
            node,
            "λ is left out",
            "λ is 0.75 or 0.85 for low density.",
            Severity.MAJOR if light else Severity.OBSERVATION,
            "8.6.5",
            {node.id: value} if light else {},
        )
    for node in view.lines("l_d0"):
        if "k_3" not in names(node):
            light = (view.number(node, "lambda_") or 1.0) < 1
            yield Caught(
                node,
                "k_3 is left out",
                "k_3 is 1.2 or 1.3 for low density.",
                Severity.MAJOR if light else Severity.OBSERVATION,
                "12.2.4",
            )


def _torsion(view: View) -> Iterator[Caught]:
    for node in view.criteria():
        counts = node.symbol == "torsion-counts" and view.holds(node)
        part = view.part(node.part)
        if not counts or "V_c" not in part:
            continue
        if "stirrups-shear-torsion" not in part:
            yield Caught(
                node,
                "torsion counts, but no stirrups are designed for it",
                "Closed stirrups for shear and torsion.",
                Severity.CRITICAL,
                "11.3.10.3",
            )
        s_max = part.get("s_max")
        if s_max is not None and not has(s_max, 0.5):
            yield Caught(
                s_max,
                "the largest spacing is not halved although torsion counts",
                "Half of the lesser of 0.7 d_v and 600 mm.",
                clause="11.3.8.3",
                right={s_max.id: view.graph.stored[s_max.id] / 2},
            )
    for node in view.values("T_f"):
        T_cr, part = view.number(node, "T_cr"), view.part(node.part)
        decided = any("T_cr" in names(other) for other in part.values() if other.sides)
        if T_cr is not None and not decided and view.graph.stored[node.id] > 0.25 * T_cr:
            yield Caught(
                node,
                "is more than a quarter of T_cr and left out of the design",
                "Design for it: it counts above 0.25 T_cr.",
                clause="11.2.9.1",
            )


def _open_stirrups(view: View) -> Iterator[Remark]:
    spans = {
        node.part.split("-")[1]
        for node in view.criteria()
        if node.symbol == "torsion-counts" and view.holds(node) and node.part.startswith("shear-")
    }
    for table in view.tables("stirrup-schedule"):
        columns = list(table["columns"])
        for row in table["rows"]:
            at = dict(zip(columns, row, strict=False))
            if at.get("Span") in spans and at.get("Form") == "open" and _within(view, at):
                named = f"Span {at['Span']}: stirrups {at.get('Mark', '')}"
                yield Remark(
                    f"{named} from {_first(at)} mm are open although torsion counts",
                    "Closed stirrups with 135° hooks.",
                    clause="11.2.7",
                    ids=(str(table["id"]),),
                )


def _first(row: Mapping[str, str]) -> str:
    """Return the place of the first stirrup of a zone, as printed."""
    return row.get(first_column(row), "")


def _within(view: View, row: Mapping[str, str]) -> bool:
    """Tell whether stirrups stand in the clear span: ties around hooks lie in the support."""
    length = view.stored(view.part(f"span-{row['Span']}").get("l_n")) or float("inf")
    start = _first(row)
    return start.isdigit() and float(start) <= length


def _half_depths(view: View) -> Iterator[Caught]:
    for node in view.lines("s_max"):
        for term in terms(node.tree) if node.tree is not None else ():
            used = names_of(term)
            if used not in (("d",), ("d_v",)) or not view.number(node, used[0]):
                continue
            share = view.compute(node, **{used[0]: 1.0})
            if share is not None and close(share, 0.5):
                yield Caught(
                    node,
                    "half the depth is the limit of another standard",
                    "The lesser of 0.7 d_v and 600 mm.",
                    Severity.MINOR,
                    "11.3.8.1",
                )


def _other_rules(view: View) -> Iterator[Caught]:
    yield from _half_depths(view)
    for node in view.lines("V_s"):
        if "A_v" in names(node) and "theta" not in names(node):
            yield Caught(
                node,
                "a truss of 45° is that of another standard",
                "V_s = φ_s A_v f_y d_v cot θ/s.",
                Severity.MINOR,
                "11.3.5",
            )
    for node in view.lines("V_c", "beta"):
        size = has(node, 200.0) and roots_of(node) & {"d", "d_v"}
        if size:
            yield Caught(
                node,
                "1 + √(200/d) is the size factor of another standard",
                "β of 11.3.6.",
                clause="11.3.6",
            )
        elif numbers(node) & _ACI:
            yield Caught(
                node,
                "the coefficient of √f'c is that of another standard",
                "V_c = φ_c λ β √f'c b_w d_v with β of 11.3.6.",
                clause="11.3.6",
            )


def _legs(view: View) -> Iterator[Caught]:
    for node in view.lines("V_s", "A_hr", "A_h", "s_v", "a_v"):
        target = view.target(node, "A_v")
        if target is not None and target.symbol in ("A_t", "A_bs", "A_b"):
            legs = view.stored(next(view.values("A_v"), None))
            value = None if legs is None else view.compute(node, A_v=legs)
            yield Caught(
                node,
                "one leg of the stirrups is counted",
                "A_v is the area of all legs.",
                clause="11.3.5",
                right=view.right(node, value),
            )
    for node in view.lines("T_r", "a_t"):
        target = view.target(node, "A_t")
        if target is not None and target.symbol == "A_v":
            yield Caught(
                node,
                "all legs are counted for torsion",
                "A_t is the area of one leg.",
                clause="11.3.10.3",
            )


TRAPS = (
    Trap(25, "factors for low density", _density),
    Trap(26, "torsion", _torsion),
    Trap(26, "open stirrups", _open_stirrups),
    Trap(28, "rules of other standards", _other_rules),
    Trap(31, "legs of the stirrups", _legs),
)
