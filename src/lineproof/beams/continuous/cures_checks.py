"""Utilisations of common checks as functions of what may be changed, by the compiled formulas.

Each takes the values of the failing section by symbol (N, mm, MPa) and gives a function of changes:
a change of ``h`` moves the bars with it, of ``b_w`` also the width of the compression zone where
that is the web, of ``f_c`` all that follows from it. Loads and moments stay as they are.
"""

from __future__ import annotations

import math
from collections.abc import Mapping
from dataclasses import replace

from lineproof.beams.continuous.cures import Utilisation, part_used
from lineproof.beams.continuous.deflection import (
    Behind,
    History,
    Place,
    SpanSection,
    deflections,
)
from lineproof.beams.continuous.deflection_service import Stage, StageMoments
from lineproof.beams.continuous.numbers import holds, put
from lineproof.formula import Criterion, Formula
from lineproof.standards.a23_3 import (
    flange,
    flexure,
    materials,
    shear,
    shear_factors,
    stress_block,
)

Values = dict[str, float]
_ABOVE_NORMAL_RULE = 40.0


def follow(values: Values, *formulas: Formula) -> Values:
    """Compute formulas one after the other, each under its symbol."""
    put(values, *formulas)
    return values


def used(test: Criterion, values: Mapping[str, float]) -> float:
    """Return the utilisation of a check: 0 where it holds without one, else infinite."""
    left, right = (side(*[values[n] for n in test.names]) for side in test.functions)
    return part_used(test, left, right)


def changed(given: Mapping[str, float], changes: Mapping[str, float]) -> Values:
    """Return the values with changes and what moves with them."""
    values = dict(given) | dict(changes)
    if "h" in changes:
        deeper = changes["h"] - given["h"]
        for depth in ("d", "d_2"):
            if depth in given:
                values[depth] = given[depth] + deeper
    if "b_w" in changes:
        wider = changes["b_w"] - given["b_w"]
        if "b" in given:
            values["b"] = given["b"] + wider
        if given.get("b_t") == given["b_w"]:
            values["b_t"] = changes["b_w"]
    return values


def _bent(values: Values) -> Values:
    """Add block, neutral axis and resistance; b, b_w, h_f (0 without a flange), d, A_s."""
    follow(values, stress_block.ALPHA_1, stress_block.BETA_1, flexure.BLOCK_RECTANGULAR)
    if values["b"] <= values["b_w"] or values["a"] <= values["h_f"]:
        return follow(values, flexure.NEUTRAL_AXIS, flexure.M_R_RECTANGULAR)
    return follow(
        values, flexure.FLANGE_FORCE, flexure.BLOCK_IN_WEB, flexure.NEUTRAL_AXIS_IN_WEB,
        flexure.M_R_TEE,
    )  # fmt: skip


def bending(given: Mapping[str, float], c_d: float | None = None) -> Utilisation:
    """Return M_f over M_r: f_c f_y phi_c phi_s b b_w h_f h d A_s M_f.

    A section whose bars do not yield has no such resistance: ``c_d`` is the largest c/d, by default
    that of 10.5.2.
    """
    yields = yielding(given, c_d)

    def utilisation(changes: Mapping[str, float]) -> float:
        if yields(changes) > 1:
            return math.inf
        return used(flexure.STRENGTH, _bent(changed(given, changes)))

    return utilisation


def yielding(given: Mapping[str, float], c_d: float | None = None) -> Utilisation:
    """Return c/d over its limit: what ``bending`` takes but M_f."""

    def utilisation(changes: Mapping[str, float]) -> float:
        values = _bent(changed(given, changes))
        if c_d is None:
            follow(values, flexure.YIELD_LIMIT)
        else:
            values["c_d"] = c_d
        return used(flexure.YIELDS, values)

    return utilisation


def shear_strength(given: Mapping[str, float]) -> Utilisation:
    """Return V_f over V_r with stirrups.

    f_c f_y phi_c phi_s lambda_ b_w h d s A_v V_f; with E_s A_s M_f by the general method, else
    beta and theta as given.
    """

    def utilisation(changes: Mapping[str, float]) -> float:
        values = follow(changed(given, changes), shear.D_V)
        if "M_f" in values:
            follow(values, shear_factors.EPS_X, shear_factors.BETA_STIRRUPS, shear_factors.THETA)
            if not shear_factors.STRAIN_IN_RANGE.holds(values["eps_x"], 0.003):
                return math.inf
        follow(values, shear.V_C, shear.V_S, shear.V_R_MAX, shear.V_R)
        return used(shear.STRENGTH, values)

    return utilisation


def stirrup_spacing(given: Mapping[str, float]) -> Utilisation:
    """Return s over its largest value, halved where the shear asks for it.

    f_c phi_c lambda_ b_w h d s V_f.
    """

    def utilisation(changes: Mapping[str, float]) -> float:
        values = follow(changed(given, changes), shear.D_V)
        follow(values, shear.S_MAX_HALVED if holds(shear.CLOSER, values) else shear.S_MAX)
        return used(shear.SPACING, values)

    return utilisation


def least_stirrups(given: Mapping[str, float]) -> Utilisation:
    """Return A_v,min over A_v: f_c f_y b_w s A_v."""

    def utilisation(changes: Mapping[str, float]) -> float:
        values = follow(changed(given, changes), shear.A_V_MIN)
        return used(shear.HAS_MINIMUM, values)

    return utilisation


def deflecting(
    section: SpanSection,
    moments: Mapping[Stage, StageMoments],
    *,
    carries: str,
    history: History | None = None,
    rise: bool = False,
    behind: tuple[SpanSection, Mapping[Stage, StageMoments]] | None = None,
    f_c: float = 0.0,
    lambda_: float = 1.0,
    gamma_c: float = 2400.0,
) -> Utilisation:
    """Return the limited deflection over its limit; h, b_w, A_s, A_sp and f_c may be changed.

    With ``rise`` that by which the span is lifted; its moments must hold that stage. ``behind`` is
    the span behind a cantilever with its moments: it is changed with it, in depth where both have
    the same.

    ``A_s`` and ``A_sp`` are those at midspan, or at the root of a cantilever; f_c, lambda and the
    density are needed where the concrete may be changed.
    """
    given = {"f_c": f_c, "lambda_": lambda_, "gamma_c": gamma_c}

    def utilisation(changes: Mapping[str, float]) -> float:
        made = _changed_section(section, changes, given)
        if behind is not None:
            names = ("h", "b_w", "f_c") if behind[0].h == section.h else ("b_w", "f_c")
            shared = {name: changes[name] for name in names if name in changes}
            back = _changed_section(behind[0], shared, given)
            bent = deflections(back, behind[1], carries=carries, history=history)
            made = replace(made, behind=Behind.of(back.l, bent))
        found = deflections(made, moments, carries=carries, history=history)
        return found.rise_used if rise else found.sag_used

    return utilisation


def _changed_section(
    section: SpanSection, changes: Mapping[str, float], given: Mapping[str, float]
) -> SpanSection:
    made = _resized(section, changes)
    if "f_c" not in changes:
        return made
    values = dict(given) | {"f_c": changes["f_c"]}
    normal = values["f_c"] <= _ABOVE_NORMAL_RULE
    rule = materials.E_C_NORMAL if normal else materials.E_C_GENERAL
    follow(values, rule, materials.F_R)
    return replace(made, E_c=values["E_c"], f_r=values["f_r"])


def _resized(section: SpanSection, changes: Mapping[str, float]) -> SpanSection:
    deeper = changes.get("h", section.h) - section.h
    b_w = changes.get("b_w", section.b_w)
    wider = b_w - section.b_w

    def place(name: str) -> Place | None:
        at: Place | None = getattr(section, name)
        if at is None:
            return None
        own = name == "midspan" or section.midspan is None
        bars = {n: changes[n] for n in ("A_s", "A_sp") if own and n in changes}
        return replace(at, b=at.b + wider, d=at.d + deeper, **bars)

    made = replace(
        section, h=section.h + deeper, b_w=b_w, midspan=place("midspan"), left=place("left"),
        right=place("right"), top=place("top"),
    )  # fmt: skip
    if not deeper and not wider:
        return made
    return _gross(made, section)


def _gross(made: SpanSection, before: SpanSection) -> SpanSection:
    """Return a section with the gross inertia that goes with its sizes."""
    b_f = _flange_width(before) + made.b_w - before.b_w
    values = {"b_w": made.b_w, "h": made.h, "b_f": b_f, "h_f": made.h_f}
    follow(values, flange.AREA_TEE, flange.CENTROID_TEE, flange.INERTIA_TEE)
    return replace(made, I_g=values["I_g"], y_b=values["y_b"])


def _flange_width(section: SpanSection) -> float:
    """Return the flange width of the gross section: the compression zone at midspan, or solved.

    In a cantilever it follows from the centroid: A_g y_b is linear in b_f.
    """
    if section.midspan is not None:
        return section.midspan.b
    if not section.h_f:
        return section.b_w
    web, arm = section.b_w * section.h, section.h - section.h_f / 2
    overhang = web * (section.y_b - section.h / 2) / (section.h_f * (arm - section.y_b))
    return section.b_w + overhang
