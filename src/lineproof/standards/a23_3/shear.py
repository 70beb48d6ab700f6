"""Clauses 11.2.8 and 11.3: shear of beams by the simplified and the general method.

No axial force and no prestress.  The strain, the longitudinal bars and the shear take moment and
shear of the same load case at the same section.
"""

from __future__ import annotations

from functools import partial

from lineproof.formula import COMMON_PRACTICE, FROM_MEMORY, criterion, formula
from lineproof.sheet import LookupTable
from lineproof.standards.a23_3.notation import NOTATION as A23_3
from lineproof.standards.nbc.notation import NOTATION as NBC
from lineproof.standards.references import MECHANICS, SHEAR_2004, SHEAR_DERIVED

_formula = partial(formula, notation=A23_3 | NBC)
_criterion = partial(criterion, notation=A23_3 | NBC)

SIMPLIFIED = LookupTable(
    "Simplified method: factor and angle",
    "kind of stirrups of the simplified method",
    {"beta": "", "theta": "deg"},
    {
        "minimum stirrups or more": {"beta": "0.18", "theta": "35"},
        "below minimum stirrups": {"theta": "35"},
    },
    "A23.3, 11.3.6.3",
    clause="11.3.6.3",
    basis=SHEAR_DERIVED,
)
SPECIAL = LookupTable(
    "Special members: factor and angle",
    "kind of special member",
    {"beta": "", "theta": "deg"},
    {"shallow beam": {"beta": "0.21", "theta": "42"}},
    "A23.3, 11.3.6.2",
    clause="11.3.6.2",
    basis=FROM_MEMORY,
)

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

GRADE_FOR_SIMPLIFIED = _criterion(
    "f_y <= 400",
    clause="11.3.6.3",
    title="Simplified method: strength of the bars",
    basis=SHEAR_DERIVED,
    numbers={"400": "MPa"},
    yes="At most 400 MPa: the simplified method may be used.",
    no="Above 400 MPa: the simplified method does NOT apply.",
    key="simplified-steel",
)
CONCRETE_FOR_SIMPLIFIED = _criterion(
    "f_c <= 60",
    clause="11.3.6.3",
    title="Simplified method: strength of the concrete",
    basis=FROM_MEMORY,
    numbers={"60": "MPa"},
    yes="At most 60 MPa: the simplified method may be used.",
    no="Above 60 MPa: the simplified method does NOT apply.",
    key="simplified-concrete",
)
SHALLOW = _criterion(
    "h <= 250",
    clause="11.3.6.2",
    title="Special member: overall depth",
    basis=FROM_MEMORY,
    numbers={"250": "mm"},
    yes="At most 250 mm deep: a special member.",
    no="Deeper than 250 mm.",
    key="shallow-beam",
)
SHALLOW_BELOW_SLAB = _criterion(
    "h - h_f <= min(b_w/2, 350)",
    unit="mm",
    clause="11.3.6.2",
    title="Special member: depth below the slab, by the stricter reading",
    basis=FROM_MEMORY,
    numbers={"350": "mm"},
    yes="Shallow below the slab: a special member.",
    no="Not shallow below the slab.",
    key="shallow-below-slab",
)
BETA_D_V = _formula(
    "beta = 230/(1000 + d_v)",
    clause="11.3.6.3",
    title="Factor without stirrups, aggregate of 20 mm or larger",
    basis=SHEAR_DERIVED,
    numbers={"230": "mm", "1000": "mm"},
)
BETA_S_ZE = _formula(
    "beta = 230/(1000 + s_ze)",
    clause="11.3.6.3",
    title="Factor without stirrups, any aggregate",
    basis=SHEAR_DERIVED,
    numbers={"230": "mm", "1000": "mm"},
)
A_G = _formula(
    "a_g = a_max*max(min((70 - f_c)/10, 1), 0)",
    clause="11.3.6.4",
    title="Aggregate size that counts: none above 70 MPa",
    basis=SHEAR_2004,
    numbers={"70": "MPa", "10": "MPa"},
)
S_Z = _formula("s_z = d_v", clause="11.3.6.3", title="Crack spacing parameter", basis=SHEAR_2004)
S_Z_LAYERS = _formula(
    "s_z = min(d_v, s_ly)",
    clause="11.3.6.3",
    title="Crack spacing parameter, layers of crack-control bars",
    basis=SHEAR_2004,
)
LAYER_COUNTS = _criterion(
    "0.003*b_w*s_z <= A_ly",
    clause="11.3.6.3",
    title="Layers of crack-control bars",
    basis=SHEAR_2004,
    yes="Each layer is large enough to control the cracks.",
    no="A layer is NOT large enough to control the cracks.",
    key="crack-control-layers",
)
S_ZE = _formula(
    "s_ze = max(35*s_z/(15 + a_g), 0.85*s_z)",
    clause="11.3.6.3",
    title="Equivalent crack spacing parameter",
    basis=FROM_MEMORY,
    numbers={"35": "mm", "15": "mm"},
)

EPS_X = _formula(
    "eps_x = (max(M_f, V_f*d_v)/d_v + V_f)/(2*E_s*A_s)",
    clause="11.3.6.4",
    title="Longitudinal strain at mid-depth",
    basis=SHEAR_2004,
)
STRAIN_IN_RANGE = _criterion(
    "eps_x <= 0.003",
    clause="11.3.6.4",
    title="Range of the longitudinal strain",
    basis=FROM_MEMORY,
    yes="The strain lies within the range of the method.",
    no="The strain lies OUTSIDE the range of the method: more longitudinal steel.",
    key="strain-range",
)
LEAST_BARS = _formula(
    "A_sx = (max(M_f, V_f*d_v)/d_v + V_f)/(2*E_s*0.003)",
    clause="11.3.6.4",
    title="Least bars with which the strain is in the range of the method",
    basis=MECHANICS,
)
BARS_IN_RANGE = _criterion(
    "A_sx <= A_s",
    clause="11.3.6.4",
    title="Bars on the face in tension, for a resistance to shear",
    basis=FROM_MEMORY,
    yes="The bars keep the strain within the range of the method.",
    no="The bars do NOT keep the strain within the range of the method: no shear resistance.",
    key="strain-bars",
)
BETA_STIRRUPS = _formula(
    "beta = 0.40/(1 + 1500*eps_x)",
    clause="11.3.6.4",
    title="Factor with minimum stirrups or more",
    basis=SHEAR_2004,
)
BETA_GENERAL = _formula(
    "beta = 0.40/(1 + 1500*eps_x)*1300/(1000 + s_ze)",
    clause="11.3.6.4",
    title="Factor below minimum stirrups",
    basis=SHEAR_2004,
    numbers={"1300": "mm", "1000": "mm"},
)
THETA = _formula(
    "theta = 29 + 7000*eps_x",
    clause="11.3.6.4",
    title="Angle of the diagonal compression",
    basis=SHEAR_2004,
    numbers={"29": "deg", "7000": "deg"},
)

FORMULAS = (
    D_V, CRITICAL_AT_D_V, CRITICAL_AT_FACE, STIRRUP_LEGS, BESIDE_CHANGE, BESIDE_END,
    V_C, V_S, V_R_MAX, V_R, V_R_PLAIN, WITH_RESTRAINT, A_V_MIN, SPACING_MINIMUM, SPACING_REQUIRED,
    S_MAX, S_MAX_HALVED, BETA_D_V, BETA_S_ZE, A_G, S_Z, S_Z_LAYERS, S_ZE, EPS_X, LEAST_BARS,
    BETA_STIRRUPS, BETA_GENERAL, THETA,
)  # fmt: skip
CRITERIA = (
    NEAR_POINT_LOADS, STRENGTH, RESTRAINT_STRENGTH, WEB_HOLDS, NEEDS_STIRRUPS, DEPTH_NEEDS_STIRRUPS,
    HAS_MINIMUM, CLOSER, SPACING, GRADE_FOR_SIMPLIFIED, CONCRETE_FOR_SIMPLIFIED, SHALLOW,
    SHALLOW_BELOW_SLAB, LAYER_COUNTS, STRAIN_IN_RANGE, BARS_IN_RANGE, CLEAR_SPACE,
    DEPTH_WITHOUT_STIRRUPS,
)  # fmt: skip
TABLES = (SIMPLIFIED, SPECIAL)
