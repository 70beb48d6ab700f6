"""Clauses 11.2.8 and 11.3: shear of beams, concrete and stirrups.

No axial force and no prestress. Factor and angle (11.3.6) stand in ``shear_factors``, what the
longitudinal bars carry in ``shear_bars``.
"""

from __future__ import annotations

from functools import partial

from lineproof.formula import COMMON_PRACTICE, FROM_MEMORY, criterion, formula
from lineproof.standards.a23_3.notation import NOTATION as A23_3
from lineproof.standards.nbc.notation import NOTATION as NBC
from lineproof.standards.references import MECHANICS, SHEAR_2004

_formula = partial(formula, notation=A23_3 | NBC)
_criterion = partial(criterion, notation=A23_3 | NBC)

D_V = _formula(
    "d_v = max(0.9*d, 0.72*h)",
    clause="2.3",
    title="Effective shear depth",
    basis=FROM_MEMORY,
)
CRITICAL_AT_D_V = _formula(
    "x_f = b_sn/2 + d_v",
    clause="11.3.2",
    title="Section considered, the effective shear depth from the face of the support",
    basis=SHEAR_2004,
)
CRITICAL_AT_FACE = _formula(
    "x_f = b_sn/2",
    clause="11.3.2",
    title="Section considered, at the face of the support",
    basis=SHEAR_2004,
)
NEAR_POINT_LOADS = _criterion(
    "V_pl <= 0.3*lambda_*phi_c*sqrt(f_c)*b_w*d_v",
    clause="11.3.2",
    title="Point loads near the support",
    basis=FROM_MEMORY,
    numbers={"0.3": "MPa^0.5"},
    yes="The point loads near the support are small: the shear at d_v from the face governs.",
    no="The point loads near the support are large: the shear at the face governs.",
    key="near-point-loads",
)
STIRRUP_LEGS = _formula(
    "A_v = n_v*A_t", clause="2.3", title="Area of the legs of a stirrup", basis=MECHANICS
)
V_C = _formula(
    "V_c = phi_c*lambda_*beta*min(1.0*sqrt(f_c), 8)*b_w*d_v",
    clause="11.3.4",
    title="Shear resistance of the concrete",
    basis=SHEAR_2004,
    numbers={"1.0": "MPa^0.5", "8": "MPa"},
)
V_S = _formula(
    "V_s = phi_s*A_v*f_y*d_v*cot(theta)/s",
    clause="11.3.5",
    title="Shear resistance of the stirrups",
    basis=SHEAR_2004,
)
V_R_MAX = _formula(
    "V_rmax = 0.25*phi_c*f_c*b_w*d_v",
    clause="11.3.3",
    title="Largest shear resistance, by crushing of the web",
    basis=SHEAR_2004,
)
V_R = _formula(
    "V_r = min(V_c + V_s, V_rmax)",
    clause="11.3.3",
    title="Factored shear resistance",
    basis=SHEAR_2004,
)
V_R_PLAIN = _formula(
    "V_r = V_c",
    clause="11.3.3",
    title="Factored shear resistance without stirrups",
    basis=SHEAR_2004,
)
STRENGTH = _criterion(
    "V_f <= V_r",
    clause="11.3.1",
    title="Shear resistance",
    basis=SHEAR_2004,
    yes="The shear resistance is sufficient.",
    no="The shear resistance is NOT sufficient.",
    key="shear-strength",
)
WITH_RESTRAINT = _formula(
    "V_fr = V_f + M_f/l",
    clause="statics",
    title="Shear with the assumed moment of restraint at this end",
    basis=MECHANICS,
)
RESTRAINT_STRENGTH = _criterion(
    "V_fr <= V_r",
    clause="11.3.1",
    title="Shear resistance with the assumed restraint",
    basis=SHEAR_2004,
    yes="The shear resistance is sufficient with the restraint.",
    no="The shear resistance is NOT sufficient with the restraint.",
    key="shear-restraint",
)
WEB_HOLDS = _criterion(
    "V_f <= V_rmax",
    clause="11.3.3",
    title="Crushing of the web",
    basis=SHEAR_2004,
    yes="The web is large enough for the shear.",
    no="The web is NOT large enough for the shear: no stirrups can help.",
    key="web-crushing",
)

NEEDS_STIRRUPS = _criterion(
    "V_f > V_c",
    clause="11.2.8.1",
    title="Whether the shear requires stirrups",
    basis=FROM_MEMORY,
    yes="The shear exceeds the resistance of the concrete: stirrups are required.",
    no="The concrete alone resists the shear.",
    key="shear-needs-stirrups",
)
DEPTH_NEEDS_STIRRUPS = _criterion(
    "h > 750",
    clause="11.2.8.1",
    title="Whether the depth requires stirrups",
    basis=FROM_MEMORY,
    numbers={"750": "mm"},
    yes="Deeper than 750 mm: at least the minimum stirrups are required.",
    no="Not deeper than 750 mm: the depth requires no stirrups.",
    key="depth-needs-stirrups",
)
DEPTH_WITHOUT_STIRRUPS = _criterion(
    "h <= 750",
    clause="11.2.8.1",
    title="Depth of a beam without stirrups",
    basis=FROM_MEMORY,
    numbers={"750": "mm"},
    yes="Not deeper than 750 mm: the depth requires no stirrups.",
    no="Deeper than 750 mm: at least the minimum stirrups are REQUIRED.",
    key="depth-without-stirrups",
)
A_V_MIN = _formula(
    "A_vmin = 0.06*sqrt(f_c)*b_w*s/f_y",
    clause="11.2.8.2",
    title="Minimum stirrups",
    basis=FROM_MEMORY,
    numbers={"0.06": "MPa^0.5"},
)
HAS_MINIMUM = _criterion(
    "A_vmin <= A_v",
    clause="11.2.8.2",
    title="Minimum stirrups provided",
    basis=FROM_MEMORY,
    yes="The stirrups are not below the minimum.",
    no="The stirrups are BELOW the minimum.",
    key="minimum-stirrups",
)
SPACING_MINIMUM = _formula(
    "s_v = A_v*f_y/(0.06*sqrt(f_c)*b_w)",
    clause="11.2.8.2",
    title="Spacing at which the stirrups are just the minimum",
    basis=FROM_MEMORY,
    numbers={"0.06": "MPa^0.5"},
)
SPACING_REQUIRED = _formula(
    "s_r = phi_s*A_v*f_y*d_v*cot(theta)/(V_f - V_c)",
    clause="11.3.5",
    title="Spacing of the stirrups that the shear requires",
    basis=SHEAR_2004,
)
CLOSER = _criterion(
    "V_f > 0.125*lambda_*phi_c*f_c*b_w*d_v",
    clause="11.3.8.3",
    title="Whether the shear halves the largest spacing",
    basis=SHEAR_2004,
    yes="The shear is high: the largest spacing is halved.",
    no="The shear is not high: the largest spacing stays whole.",
    key="shear-halves-spacing",
)
S_MAX = _formula(
    "s_max = min(0.7*d_v, 600)",
    clause="11.3.8.1",
    title="Largest spacing of the stirrups",
    basis=SHEAR_2004,
    numbers={"600": "mm"},
)
S_MAX_HALVED = _formula(
    "s_max = 0.5*min(0.7*d_v, 600)",
    clause="11.3.8.3",
    title="Largest spacing of the stirrups, halved",
    basis=SHEAR_2004,
    numbers={"600": "mm"},
)
SPACING = _criterion(
    "s <= s_max",
    clause="11.3.8",
    title="Spacing of the stirrups",
    basis=SHEAR_2004,
    yes="The stirrups are close enough.",
    no="The stirrups are NOT close enough.",
    key="stirrup-spacing",
)

CLEAR_SPACE = _criterion(
    "75 <= s - d_bs",
    unit="mm",
    clause="detailing",
    title="Clear space between the stirrups, for placing the concrete",
    basis=COMMON_PRACTICE,
    numbers={"75": "mm"},
    yes="The stirrups leave room for placing the concrete.",
    no="The stirrups leave TOO LITTLE room for placing the concrete.",
    key="stirrup-clear-space",
)
BESIDE_CHANGE = _formula(
    "s_x = 1/((0.5 + x_z/h)/s + (0.5 - x_z/h)/s_n)",
    clause="11.3.7",
    title="Spacing that counts, the stirrups changing over the depth h",
    basis=SHEAR_2004,
)
BESIDE_END = _formula(
    "s_x = s/(0.5 + x_z/h)",
    clause="11.3.7",
    title="Spacing that counts, the stirrups ending there",
    basis=SHEAR_2004,
)

FORMULAS = (
    D_V, CRITICAL_AT_D_V, CRITICAL_AT_FACE, STIRRUP_LEGS, BESIDE_CHANGE, BESIDE_END,
    V_C, V_S, V_R_MAX, V_R, V_R_PLAIN, WITH_RESTRAINT, A_V_MIN, SPACING_MINIMUM, SPACING_REQUIRED,
    S_MAX, S_MAX_HALVED,
)  # fmt: skip
CRITERIA = (
    NEAR_POINT_LOADS, STRENGTH, RESTRAINT_STRENGTH, WEB_HOLDS, NEEDS_STIRRUPS, DEPTH_NEEDS_STIRRUPS,
    HAS_MINIMUM, CLOSER, SPACING, CLEAR_SPACE, DEPTH_WITHOUT_STIRRUPS,
)  # fmt: skip
