"""Published cases of sections, shear, hooks, cracks and deflection: C3, D1, N3, J2, I1, H2, G1."""

from __future__ import annotations

from collections.abc import Mapping
from functools import partial

from lineproof.beams.validation.case_steps import CaseSteps, Predict
from lineproof.beams.validation.notation import notation_for
from lineproof.formula import formula
from lineproof.standards.a23_3 import bars, crack_control, deflection, flange, hooks, shear

_formula = partial(formula, notation=notation_for(frozenset()))

LEAST_STIRRUPS = _formula(
    "A_vmin = max(0.0625*sqrt(f_c), 0.33333)*b_w*s/f_y",
    clause="ACI 318M",
    title="Minimum stirrups of the source: root of f′c over 16, at least a third of a MPa",
    numbers={"0.0625": "MPa^0.5", "0.33333": "MPa"},
)
FORMULAS = (LEAST_STIRRUPS,)
_BARS = ("15", "20", "25")


def _c3(steps: CaseSteps) -> None:
    steps.own("A_tr1 = n_E*A_s", "Transformed area of the bars")
    steps.lines(deflection.AXIS, deflection.CRACKED)
    steps.own("f_ct = M_a*kd/I_cr", "Stress at the top of the concrete")
    steps.own("f_st = n_E*M_a*(d - kd)/I_cr", "Stress in the bars")


def _d1(steps: CaseSteps) -> None:
    steps.lines(flange.AREA_TEE, flange.CENTROID_TEE, flange.CENTROID_TOP, flange.INERTIA_TEE)
    steps.line(flange.CRACKING_BOTTOM)


def _n3(steps: CaseSteps) -> None:
    steps.lines(flange.AREA_TEE, flange.CENTROID_TEE, flange.CENTROID_TOP, flange.INERTIA_TEE)


def _g1(steps: CaseSteps) -> None:
    steps.line(shear.V_C)
    steps.own("V_c1 = 0.75*V_c", "With the member factor 0.75 of the source")
    steps.own("V_c2 = 0.5*V_c1", "Shear above which the source asks for stirrups")
    steps.own("V_c3 = 3*V_c1", "Shear above which the source halves the spacing")
    steps.own("V_c5 = 5*V_c1", "Largest shear of the source")
    steps.line(LEAST_STIRRUPS)
    steps.own(
        "A_v45 = (V_u/0.75 - V_c)*s/(f_y*d_v*cot(theta))", "Stirrup legs that the shear requires"
    )


def _h2(steps: CaseSteps) -> None:
    for size in _BARS:
        d_b = steps.lookup(f"d_b{size}", bars.BARS, f"{size}M", "d_b")
        steps.line(hooks.BASIC, f"l_h{size}", d_b=d_b)


def _i1(steps: CaseSteps) -> None:
    steps.line(crack_control.D_C)
    steps.line(crack_control.TENSION_AREA, d_s=steps.entry("d_c"))
    steps.line(crack_control.Z)
    steps.lookup("z_max", crack_control.LIMITS, "interior")
    steps.lookup("z_maxe", crack_control.LIMITS, "exterior", "z_max")


def _j2(steps: CaseSteps) -> None:
    steps.lines(flange.INERTIA_RECTANGLE, flange.CENTROID_RECTANGLE, deflection.CRACKING_BOTTOM)
    steps.lines(deflection.AXIS, deflection.CRACKED, deflection.MOMENT_SIMPLE)
    steps.lines(deflection.EFFECTIVE, deflection.SIMPLE_SPAN)


SECTION_CASES: Mapping[str, Predict] = {
    "C3": _c3, "D1": _d1, "N3": _n3, "G1": _g1, "H2": _h2, "I1": _i1, "J2": _j2,
}  # fmt: skip
"""How every case is predicted, by its id."""
