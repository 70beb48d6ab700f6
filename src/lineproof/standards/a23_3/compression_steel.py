"""Doubly reinforced sections: compression bars counted, displaced concrete taken off or not."""

from __future__ import annotations

from functools import partial

from lineproof.formula import FROM_MEMORY, criterion, formula
from lineproof.standards.a23_3.notation import NOTATION
from lineproof.standards.references import MECHANICS

_formula = partial(formula, notation=NOTATION)
_criterion = partial(criterion, notation=NOTATION)

STRESS = _formula(
    "f_sp = min(f_y, E_s*eps_cu*(c - d_p)/c)",
    clause="8.5.3.2",
    title="Stress in the compression bars, from strains",
    basis=MECHANICS,
)
FORCE = _formula(
    "C_s = A_sp*(phi_s*f_sp - alpha_1*phi_c*f_c)",
    clause="8.5.3.2",
    title="Compression in the bars, displaced concrete taken off",
    basis=MECHANICS,
)
FORCE_GROSS = _formula(
    "C_s = A_sp*phi_s*f_sp",
    clause="8.5.3.2",
    title="Compression in the bars, displaced concrete neglected",
    basis=MECHANICS,
)
BLOCK = _formula(
    "a = beta_1*c", clause="10.1.7", title="Depth of the stress block", basis=FROM_MEMORY
)
CONCRETE_FORCE = _formula(
    "C_c = alpha_1*phi_c*f_c*b*a",
    clause="10.1.7",
    title="Compression in the concrete",
    basis=MECHANICS,
)
CONCRETE_FORCE_TEE = _formula(
    "C_c = alpha_1*phi_c*f_c*((b - b_w)*h_f + b_w*a)",
    clause="10.1.7",
    title="Compression in the concrete, flange and web",
    basis=MECHANICS,
)
TENSION = _formula(
    "T_s = phi_s*A_s*f_y", clause="8.5.3.2", title="Tension in the bars at yield", basis=MECHANICS
)
M_R = _formula(
    "M_r = C_c*(d - a/2) + C_s*(d - d_p)",
    clause="10.1",
    title="Factored moment resistance with compression bars",
    basis=MECHANICS,
)
M_R_TEE = _formula(
    "M_r = alpha_1*phi_c*f_c*((b - b_w)*h_f*(d - h_f/2) + b_w*a*(d - a/2)) + C_s*(d - d_p)",
    clause="10.1",
    title="Factored moment resistance with compression bars, flange and web",
    basis=MECHANICS,
)
STAYS_IN_FLANGE = _criterion(
    "phi_s*A_s*f_y <= alpha_1*phi_c*f_c*b*h_f + A_sp*(phi_s*min(f_y,"
    " E_s*eps_cu*(h_f/beta_1 - d_p)/(h_f/beta_1)) - alpha_1*phi_c*f_c)",
    clause="10.1.7",
    unit="kN",
    title="Whether the block stays in the flange, compression bars counted",
    basis=MECHANICS,
    yes="The block stays in the flange: the section acts as a rectangle of width b.",
    no="The block leaves the flange: flange and web are taken apart.",
    key="block-in-flange",
)
IN_COMPRESSION = _criterion(
    "alpha_1*phi_c*f_c*b*beta_1*d_p <= phi_s*A_s*f_y",
    unit="kN",
    clause="8.5.3.2",
    title="Whether the upper bars are in compression",
    basis=MECHANICS,
    yes="With the axis at the upper bars the concrete is too weak: the axis lies deeper, "
    "the bars are in compression.",
    no="With the axis at the upper bars the concrete is too strong: the axis lies higher, "
    "the bars are not in compression.",
    key="upper-bars-in-compression",
)
_TENSION = "phi_s*A_s*min(f_y, E_s*eps_cu*(d - c)/c)"
CLOSES = _criterion(
    "abs(alpha_1*phi_c*f_c*b*beta_1*c + A_sp*(phi_s*min(f_y, E_s*eps_cu*(c - d_p)/c)"
    f" - alpha_1*phi_c*f_c) - {_TENSION}) <= 0.001*{_TENSION}",
    clause="10.1.1",
    unit="kN",
    title="Equilibrium of the section",
    basis=MECHANICS,
    key="equilibrium",
)
CLOSES_TEE = _criterion(
    "abs(alpha_1*phi_c*f_c*((b - b_w)*h_f + b_w*beta_1*c)"
    " + A_sp*(phi_s*min(f_y, E_s*eps_cu*(c - d_p)/c) - alpha_1*phi_c*f_c)"
    f" - {_TENSION}) <= 0.001*{_TENSION}",
    clause="10.1.1",
    unit="kN",
    title="Equilibrium of the section, flange and web",
    basis=MECHANICS,
    key="equilibrium",
)

FORMULAS = (
    STRESS,
    FORCE,
    FORCE_GROSS,
    BLOCK,
    CONCRETE_FORCE,
    CONCRETE_FORCE_TEE,
    TENSION,
    M_R,
    M_R_TEE,
)
CRITERIA = (STAYS_IN_FLANGE, IN_COMPRESSION, CLOSES, CLOSES_TEE)
