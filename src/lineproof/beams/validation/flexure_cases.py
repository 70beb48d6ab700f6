"""Published cases of bending: A1, A2, A4, B1, B2, C1, E3."""

from __future__ import annotations

from collections.abc import Mapping

from lineproof.beams.validation.case_steps import CaseSteps, Predict
from lineproof.beams.validation.procedures import AXIS_NEGLECTING, AXIS_NEGLECTING_CLOSES
from lineproof.standards.a23_3 import (
    compression_steel,
    crack_control,
    flange,
    flexure,
    materials,
    minimum,
    stress_block,
)

_DEPTH = ("d = h - d_c", "Effective depth of one layer")
_FACTORED = ("M_u = 0.9*M_r", "With the member factor 0.9 of the source")


def _a1(steps: CaseSteps) -> None:
    steps.line(crack_control.D_C)
    steps.own(*_DEPTH)
    steps.own("rho = A_s/(b*d)", "Ratio of reinforcement")
    steps.lines(stress_block.ALPHA_1, stress_block.BETA_1)
    steps.lines(flexure.BLOCK_RECTANGULAR, flexure.M_R_RECTANGULAR)
    steps.own("K_r = M_r/(b*d**2)", "Resistance over b d²")


def _a2(steps: CaseSteps) -> None:
    steps.line(crack_control.D_C)
    steps.own(*_DEPTH)
    steps.own("K_r = M_f/(b*d**2)", "Moment over b d²")
    steps.lines(stress_block.ALPHA_1, stress_block.BETA_1)
    steps.lines(flexure.BLOCK_REQUIRED, flexure.A_S_REQUIRED)
    steps.lines(flange.INERTIA_RECTANGLE, flange.CENTROID_RECTANGLE, materials.F_R)
    steps.line(flange.CRACKING_BOTTOM)
    steps.own("M_12 = 1.2*M_cr", "Moment that the least reinforcement must resist")
    steps.lines(minimum.WIDTH_WEB, minimum.A_S_MIN)
    steps.lines(flexure.BLOCK_RECTANGULAR, flexure.M_R_RECTANGULAR)
    steps.decide(flexure.STRENGTH)


def _a4(steps: CaseSteps) -> None:
    steps.lines(flexure.BLOCK_RECTANGULAR, flexure.NEUTRAL_AXIS, flexure.STEEL_STRAIN)
    steps.line(flexure.M_R_RECTANGULAR)


def _b1(steps: CaseSteps) -> None:
    steps.line(flexure.BLOCK_RECTANGULAR)
    steps.decide(flexure.IN_FLANGE)
    steps.line(flexure.FLANGE_FORCE)
    steps.own("A_sf = C_f/(phi_s*f_y)", "Bars balanced by the overhanging flanges")
    steps.lines(flexure.BLOCK_IN_WEB, flexure.M_R_TEE)
    steps.own(*_FACTORED)


def _b2(steps: CaseSteps) -> None:
    steps.lines(compression_steel.TENSION, flexure.BLOCK_RECTANGULAR)
    steps.decide(flexure.IN_FLANGE)
    steps.own("A_cc = a*b", "Concrete in compression")
    steps.line(flexure.NEUTRAL_AXIS)
    steps.own("j_d = d - a/2", "Lever arm")
    steps.line(flexure.M_R_RECTANGULAR)
    steps.own(*_FACTORED)


def _c1(steps: CaseSteps) -> None:
    steps.find(
        "c", AXIS_NEGLECTING, AXIS_NEGLECTING_CLOSES, clause="10.1.1",
        title="Depth of the neutral axis, displaced concrete neglected",
    )  # fmt: skip
    steps.lines(compression_steel.BLOCK, compression_steel.STRESS, compression_steel.FORCE_GROSS)
    steps.own("eps_sp = eps_cu*(c - d_p)/c", "Strain of the compression bars")
    steps.line(flexure.STEEL_STRAIN)
    steps.lines(compression_steel.CONCRETE_FORCE, compression_steel.M_R)
    steps.own(*_FACTORED)


def _e3(steps: CaseSteps) -> None:
    steps.line(flexure.YIELD_LIMIT)
    steps.lines(stress_block.ALPHA_1, stress_block.BETA_1, stress_block.C_BALANCED)
    steps.lines(stress_block.A_BALANCED, stress_block.C_BALANCED_RECTANGULAR)
    steps.line(stress_block.A_S_BALANCED)
    steps.own("rho_b = 100*A_sb/(b*d)", "Ratio of balanced reinforcement, per cent")


FLEXURE_CASES: Mapping[str, Predict] = {
    "A1": _a1, "A2": _a2, "A4": _a4, "B1": _b1, "B2": _b2, "C1": _c1, "E3": _e3,
}  # fmt: skip
"""How every case is predicted, by its id."""
