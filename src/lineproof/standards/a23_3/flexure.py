"""Clauses 8.1, 10.1 and 10.5.2: moment resistance and the reinforcement required for a moment."""

from __future__ import annotations

from functools import partial

from lineproof.formula import FROM_MEMORY, criterion, formula
from lineproof.standards.a23_3.notation import NOTATION
from lineproof.standards.references import MECHANICS

_formula = partial(formula, notation=NOTATION)
_criterion = partial(criterion, notation=NOTATION)

BLOCK_RECTANGULAR = _formula(
    "a = phi_s*A_s*f_y/(alpha_1*phi_c*f_c*b)",
    clause="10.1.7",
    title="Depth of the stress block, width b",
    basis=FROM_MEMORY,
)
IN_FLANGE = _criterion(
    "a <= h_f",
    clause="10.1.7",
    title="Where the stress block ends",
    basis=MECHANICS,
    yes="The block stays in the flange: the section acts as a rectangle of width b.",
    no="The block leaves the flange: flange and web are taken apart.",
    key="block-in-flange",
)
FLANGE_FORCE = _formula(
    "C_f = alpha_1*phi_c*f_c*(b - b_w)*h_f",
    clause="10.1.7",
    title="Compression in the overhanging flanges",
    basis=FROM_MEMORY,
)
BLOCK_IN_WEB = _formula(
    "a_w = (phi_s*A_s*f_y - C_f)/(alpha_1*phi_c*f_c*b_w)",
    clause="10.1.7",
    title="Depth of the stress block, in the web",
    basis=FROM_MEMORY,
)
WEB_FORCE = _formula(
    "C_w = alpha_1*phi_c*f_c*b_w*a_w",
    clause="10.1.7",
    title="Compression in the web",
    basis=FROM_MEMORY,
)
# With c = a/beta_1 put in: a rounded c would ask for two digits more, here and where it stands.
STEEL_STRAIN = _formula(
    "eps_s = eps_cu*(beta_1*d - a)/a",
    clause="10.1.2",
    title="Strain at the centroid of the tension bars",
    basis=MECHANICS,
)
NEUTRAL_AXIS = _formula(
    "c = a/beta_1", clause="10.1.7", title="Depth of the neutral axis", basis=FROM_MEMORY
)
NEUTRAL_AXIS_IN_WEB = _formula(
    "c = a_w/beta_1", clause="10.1.7", title="Depth of the neutral axis", basis=FROM_MEMORY
)
M_R_RECTANGULAR = _formula(
    "M_r = phi_s*A_s*f_y*(d - a/2)",
    clause="10.1",
    title="Factored moment resistance",
    basis=MECHANICS,
)
M_R_TEE = _formula(
    "M_r = C_f*(d - h_f/2) + (phi_s*A_s*f_y - C_f)*(d - a_w/2)",
    clause="10.1",
    title="Factored moment resistance, flange and web",
    basis=MECHANICS,
)
STRENGTH = _criterion(
    "M_f <= M_r",
    clause="8.1.3",
    title="Moment resistance",
    basis=FROM_MEMORY,
    yes="The moment resistance is sufficient.",
    no="The moment resistance is NOT sufficient.",
    key="strength",
)

YIELD_LIMIT = _formula(
    "c_d = 700/(700 + f_y)",
    clause="10.5.2",
    title="Limit of c/d for bars taken to yield",
    basis=FROM_MEMORY,
    numbers={"700": "MPa"},
)
YIELDS = _criterion(
    "c/d <= c_d",
    clause="10.5.2",
    title="Yield of the tension bars",
    basis=FROM_MEMORY,
    yes="The bars yield before the concrete crushes.",
    no="The bars do NOT yield before the concrete crushes: less reinforcement or a deeper section.",
    key="yield",
)
UPPER_LAYER_YIELDS = _criterion(
    "c/d_2 <= c_d",
    clause="10.5.2",
    title="Yield of the upper layer of tension bars",
    basis=FROM_MEMORY,
    yes="The upper layer yields as well.",
    no="The upper layer does NOT yield: less reinforcement, or the bars in one layer.",
    key="yield-upper",
)

M_R_FLANGE_FULL = _formula(
    "M_rf = alpha_1*phi_c*f_c*b*h_f*(d - h_f/2)",
    clause="10.1",
    title="Moment resistance with the block just filling the flange",
    basis=MECHANICS,
)
NEEDS_FLANGE_ONLY = _criterion(
    "M_f <= M_rf",
    clause="10.1",
    title="Whether the flange alone balances the moment",
    basis=MECHANICS,
    yes="The block needed for the moment stays in the flange.",
    no="The block needed for the moment reaches into the web.",
    key="flange-is-enough",
)
LARGEST_MOMENT = _formula(
    "M_rc = alpha_1*phi_c*f_c*b*d**2/2",
    clause="10.1",
    title="Largest moment that the concrete balances, with the block down to the bars",
    basis=MECHANICS,
)
LARGEST_MOMENT_TEE = _formula(
    "M_rc = C_f*(d - h_f/2) + alpha_1*phi_c*f_c*b_w*d**2/2",
    clause="10.1",
    title="Largest moment that the concrete balances, with the block down to the bars",
    basis=MECHANICS,
)
BALANCES = _criterion(
    "M_f <= M_rc",
    clause="10.1",
    title="Whether the concrete balances the moment",
    basis=MECHANICS,
    yes="The concrete balances the moment.",
    no="The concrete does NOT balance the moment, whatever the bars: a deeper or wider section, "
    "stronger concrete or less load.",
    key="concrete-balances",
)
BLOCK_LARGEST = _formula(
    "a_r = d",
    clause="10.1",
    title="Depth of the block, down to the bars",
    basis=MECHANICS,
)
BLOCK_REQUIRED = _formula(
    "a_r = d - sqrt(d**2 - 2*M_f/(alpha_1*phi_c*f_c*b))",
    clause="10.1",
    title="Depth of the block needed for the moment",
    basis=MECHANICS,
)
A_S_REQUIRED = _formula(
    "A_sr = alpha_1*phi_c*f_c*b*a_r/(phi_s*f_y)",
    clause="10.1",
    title="Reinforcement required for the moment",
    basis=MECHANICS,
)
WEB_MOMENT = _formula(
    "M_rw = M_f - C_f*(d - h_f/2)",
    clause="10.1",
    title="Moment left to the web",
    basis=MECHANICS,
)
BLOCK_REQUIRED_WEB = _formula(
    "a_r = d - sqrt(d**2 - 2*M_rw/(alpha_1*phi_c*f_c*b_w))",
    clause="10.1",
    title="Depth of the block needed for the moment, in the web",
    basis=MECHANICS,
)
A_S_REQUIRED_WEB = _formula(
    "A_sr = (C_f + alpha_1*phi_c*f_c*b_w*a_r)/(phi_s*f_y)",
    clause="10.1",
    title="Reinforcement required for the moment, flange and web",
    basis=MECHANICS,
)
ENOUGH_STEEL = _criterion(
    "A_sr <= A_s",
    clause="8.1.3",
    title="Reinforcement provided for the moment",
    basis=FROM_MEMORY,
    yes="The reinforcement provided covers what the moment requires.",
    no="The reinforcement provided does NOT cover what the moment requires.",
    key="steel-for-moment",
)

FORMULAS = (
    BLOCK_RECTANGULAR,
    FLANGE_FORCE,
    BLOCK_IN_WEB,
    WEB_FORCE,
    STEEL_STRAIN,
    NEUTRAL_AXIS,
    NEUTRAL_AXIS_IN_WEB,
    M_R_RECTANGULAR,
    M_R_TEE,
    YIELD_LIMIT,
    M_R_FLANGE_FULL,
    LARGEST_MOMENT,
    LARGEST_MOMENT_TEE,
    BLOCK_LARGEST,
    BLOCK_REQUIRED,
    A_S_REQUIRED,
    WEB_MOMENT,
    BLOCK_REQUIRED_WEB,
    A_S_REQUIRED_WEB,
)
CRITERIA = (
    IN_FLANGE,
    STRENGTH,
    YIELDS,
    UPPER_LAYER_YIELDS,
    BALANCES,
    NEEDS_FLANGE_ONLY,
    ENOUGH_STEEL,
)
