"""Clause 10.1: the equivalent rectangular stress block and the balanced condition."""

from __future__ import annotations

from functools import partial

from lineproof.formula import FROM_MEMORY, criterion, formula
from lineproof.standards.a23_3.notation import NOTATION
from lineproof.standards.references import MECHANICS

_formula = partial(formula, notation=NOTATION)
_criterion = partial(criterion, notation=NOTATION)

ALPHA_1 = _formula(
    "alpha_1 = max(0.85 - 0.0015*f_c, 0.67)",
    clause="10.1.7",
    title="Stress of the rectangular block",
    basis=FROM_MEMORY,
    numbers={"0.0015": "1/MPa"},
)
BETA_1 = _formula(
    "beta_1 = max(0.97 - 0.0025*f_c, 0.67)",
    clause="10.1.7",
    title="Depth of the rectangular block",
    basis=FROM_MEMORY,
    numbers={"0.0025": "1/MPa"},
)

C_BALANCED = _formula(
    "c_b = d*eps_cu/(eps_cu + f_y/E_s)",
    clause="10.1.4",
    title="Neutral axis when the bars just yield as the concrete crushes",
    basis=MECHANICS,
)
A_BALANCED = _formula(
    "a_b = beta_1*c_b",
    clause="10.1.7",
    title="Depth of the block at the balanced condition",
    basis=MECHANICS,
)
BALANCED_IN_FLANGE = _criterion(
    "a_b <= h_f",
    clause="10.1.7",
    title="Where the balanced block ends",
    basis=MECHANICS,
    yes="The balanced block stays in the flange.",
    no="The balanced block leaves the flange and reaches into the web.",
    key="balanced-block-in-flange",
)
C_BALANCED_RECTANGULAR = _formula(
    "C_b = alpha_1*phi_c*f_c*b*a_b",
    clause="10.1.7",
    title="Compression at the balanced condition",
    basis=MECHANICS,
)
C_BALANCED_TEE = _formula(
    "C_b = alpha_1*phi_c*f_c*((b - b_w)*h_f + b_w*a_b)",
    clause="10.1.7",
    title="Compression at the balanced condition, flange and web",
    basis=MECHANICS,
)
A_S_BALANCED = _formula(
    "A_sb = C_b/(phi_s*f_y)",
    clause="10.1.1",
    title="Balanced reinforcement, by equilibrium",
    basis=MECHANICS,
)
M_R_BALANCED_RECTANGULAR = _formula(
    "M_rb = C_b*(d - a_b/2)",
    clause="10.1",
    title="Moment resistance at the balanced condition",
    basis=MECHANICS,
)
M_R_BALANCED_TEE = _formula(
    "M_rb = alpha_1*phi_c*f_c*((b - b_w)*h_f*(d - h_f/2) + b_w*a_b*(d - a_b/2))",
    clause="10.1",
    title="Moment resistance at the balanced condition, flange and web",
    basis=MECHANICS,
)

FORMULAS = (
    ALPHA_1,
    BETA_1,
    C_BALANCED,
    A_BALANCED,
    C_BALANCED_RECTANGULAR,
    C_BALANCED_TEE,
    A_S_BALANCED,
    M_R_BALANCED_RECTANGULAR,
    M_R_BALANCED_TEE,
)
CRITERIA = (BALANCED_IN_FLANGE,)
