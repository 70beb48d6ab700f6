"""Clause 11.3.6: the factor beta and the angle theta, by the simplified and the general method.

The strain of the general method takes moment and shear of the same load case at the same section.
"""

from __future__ import annotations

from functools import partial

from lineproof.formula import FROM_MEMORY, criterion, formula
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
    BETA_D_V, BETA_S_ZE, A_G, S_Z, S_Z_LAYERS, S_ZE, EPS_X, LEAST_BARS, BETA_STIRRUPS, BETA_GENERAL,
    THETA,
)  # fmt: skip
CRITERIA = (
    GRADE_FOR_SIMPLIFIED, CONCRETE_FOR_SIMPLIFIED, SHALLOW, SHALLOW_BELOW_SLAB, LAYER_COUNTS,
    STRAIN_IN_RANGE, BARS_IN_RANGE,
)  # fmt: skip
TABLES = (SIMPLIFIED, SPECIAL)
