"""Clauses 11.2.9 and 11.3.10: torsion with shear, closed stirrups; no axial force."""

from __future__ import annotations

from functools import partial

from lineproof.formula import COMMON_PRACTICE, FROM_MEMORY, criterion, formula
from lineproof.standards.a23_3.notation import NOTATION as A23_3
from lineproof.standards.nbc.notation import NOTATION as NBC
from lineproof.standards.references import MECHANICS, SHEAR_2004

_formula = partial(formula, notation=A23_3 | NBC)
_criterion = partial(criterion, notation=A23_3 | NBC)

AREA_RECTANGLE = _formula(
    "A_c = b_w*h", clause="2.3", title="Area enclosed by the perimeter", basis=MECHANICS
)
PERIMETER_RECTANGLE = _formula(
    "p_c = 2*(b_w + h)", clause="2.3", title="Perimeter of the concrete", basis=MECHANICS
)
AREA_OF_STIRRUP = _formula(
    "A_oh = (b_w - 2*c_c - d_bs)*(h - 2*c_c - d_bs)",
    clause="2.3",
    title="Area enclosed by the centre line of the closed stirrup",
    basis=MECHANICS,
)
PERIMETER_OF_STIRRUP = _formula(
    "p_h = 2*(b_w - 2*c_c - d_bs + h - 2*c_c - d_bs)",
    clause="2.3",
    title="Perimeter of the centre line of the closed stirrup",
    basis=MECHANICS,
)
A_O = _formula(
    "A_o = 0.85*A_oh",
    clause="11.3.10.3",
    title="Area enclosed by the path of shear flow",
    basis=FROM_MEMORY,
)
T_CR = _formula(
    "T_cr = A_c**2/p_c*0.38*lambda_*phi_c*sqrt(f_c)",
    clause="11.2.9.1",
    title="Torsion that cracks the section",
    basis=FROM_MEMORY,
    numbers={"0.38": "MPa^0.5"},
)
OVERHANG = _formula(
    "b_pf = min(b_o, h - h_f, 4*h_f)",
    unit="mm",
    clause="2.3",
    title="Width of the overhang that counts",
    basis=COMMON_PRACTICE,
)
AREA_L = _formula(
    "A_cf = b_w*h + b_pf*h_f",
    clause="2.3",
    title="Area of the concrete with its overhang",
    basis=MECHANICS,
)
PERIMETER_L = _formula(
    "p_cf = 2*(b_w + h + b_pf)",
    clause="2.3",
    title="Perimeter of the concrete with its overhang",
    basis=MECHANICS,
)
AREA_T = _formula(
    "A_cf = b_w*h + 2*b_pf*h_f",
    clause="2.3",
    title="Area of the concrete with its overhangs",
    basis=MECHANICS,
)
PERIMETER_T = _formula(
    "p_cf = 2*(b_w + h + 2*b_pf)",
    clause="2.3",
    title="Perimeter of the concrete with its overhangs",
    basis=MECHANICS,
)
T_CR_FLANGE = _formula(
    "T_crf = max(A_c**2/p_c, A_cf**2/p_cf)*0.38*lambda_*phi_c*sqrt(f_c)",
    clause="11.2.9.1",
    title="Torsion that cracks the section, overhang counted",
    basis=FROM_MEMORY,
    numbers={"0.38": "MPa^0.5"},
)
FROM_FACE = _formula(
    "x_n = x_f - b_sn/2",
    clause="geometry",
    title="Distance of the section from the near face",
    basis=MECHANICS,
)
TORQUE = _formula(
    "T_f = t_f*(l_n/2 - x_n)",
    clause="statics",
    title="Torsion at the section, the ends held at the faces of the supports",
    basis=MECHANICS,
)
TORQUE_CANTILEVER = _formula(
    "T_f = t_f*(l_n - x_n)",
    clause="statics",
    title="Torsion at the section of a cantilever, held at the face of its support",
    basis=MECHANICS,
)
COUNTS = _criterion(
    "T_f > 0.25*T_cr",
    clause="11.2.9.1",
    title="Whether torsion counts",
    basis=FROM_MEMORY,
    yes="Torsion counts: closed stirrups, the largest spacing is halved.",
    no="Torsion is so small that it may be neglected.",
    key="torsion-counts",
)
COMPATIBILITY = _formula(
    "T_fr = min(T_f, 0.67*T_cr)",
    clause="11.2.9.2",
    title="Torsion designed for where the frame can redistribute it",
    basis=FROM_MEMORY,
)
T_R = _formula(
    "T_r = 2*A_o*phi_s*A_t*f_y*cot(theta)/s",
    clause="11.3.10.3",
    title="Factored torsional resistance",
    basis=FROM_MEMORY,
)
STRENGTH = _criterion(
    "T_f <= T_r",
    clause="11.3.10.1",
    title="Torsional resistance",
    basis=FROM_MEMORY,
    yes="The torsional resistance is sufficient.",
    no="The torsional resistance is NOT sufficient.",
    key="torsion-strength",
)
LEG_FOR_TORSION = _formula(
    "a_t = T_f/(2*A_o*phi_s*f_y*cot(theta))",
    clause="11.3.10.3",
    title="Stirrup leg that torsion requires, per length",
    basis=FROM_MEMORY,
)
LEGS_FOR_SHEAR = _formula(
    "a_v = max(V_f - V_c, 0)/(phi_s*f_y*d_v*cot(theta))",
    clause="11.3.5",
    title="Stirrup legs that shear requires, per length",
    basis=SHEAR_2004,
)
LEGS = _formula(
    "a_vt = a_v + 2*a_t",
    clause="11.3.10.3",
    title="Stirrup legs for shear and torsion, two of them closed around the section",
    basis=FROM_MEMORY,
)
LEGS_LEFT = _formula(
    "A_vr = A_v - 2*a_t*s",
    clause="11.3.10.3",
    title="Stirrup legs that torsion leaves for shear",
    basis=FROM_MEMORY,
)
LEGS_PROVIDED = _criterion(
    "a_vt <= A_v/s",
    clause="11.3.10.3",
    title="Closed stirrups for shear and torsion",
    basis=FROM_MEMORY,
    yes="The closed stirrups carry shear and torsion together.",
    no="The closed stirrups do NOT carry shear and torsion together.",
    key="stirrups-shear-torsion",
)
SECTION = _criterion(
    "sqrt((V_f/(b_w*d_v))**2 + (T_f*p_h/(1.7*A_oh**2))**2) <= 0.25*phi_c*f_c",
    unit="MPa",
    clause="11.3.10.4",
    title="Size of the section for shear and torsion",
    basis=FROM_MEMORY,
    yes="The section is large enough for shear and torsion.",
    no="The section is NOT large enough for shear and torsion: no stirrups can help.",
    key="section-shear-torsion",
)
SHEAR_IN_STRAIN = _formula(
    "V_fe = sqrt(V_f**2 + (0.9*p_h*T_f/(2*A_o))**2)",
    clause="11.3.10.5",
    title="Equivalent shear of shear and torsion, for the strain",
    basis=FROM_MEMORY,
)
EPS_X = _formula(
    "eps_x = (max(M_f, V_f*d_v)/d_v + V_fe)/(2*E_s*A_s)",
    clause="11.3.10.5",
    title="Longitudinal strain at mid-depth, with torsion",
    basis=FROM_MEMORY,
)
LEAST_BARS = _formula(
    "A_sx = (max(M_f, V_f*d_v)/d_v + V_fe)/(2*E_s*0.003)",
    clause="11.3.10.5",
    title="Least bars with which the strain is in the range of the method, with torsion",
    basis=MECHANICS,
)
SHEAR_IN_BARS = _formula(
    "V_le = sqrt((V_f - 0.5*min(V_s, V_f))**2 + (0.45*p_h*T_f/(2*A_o))**2)",
    clause="11.3.10.6",
    title="Equivalent shear of shear and torsion, for the bars",
    basis=FROM_MEMORY,
)
TENSION_SIDE = _formula(
    "F_lt = M_f/d_v + V_le*cot(theta)",
    clause="11.3.10.6",
    title="Force in the bars on the tension side, with torsion",
    basis=FROM_MEMORY,
)
COMPRESSION_SIDE = _formula(
    "F_lc = max(V_le*cot(theta) - M_f/d_v, 0)",
    clause="11.3.10.6",
    title="Force in the bars on the compression side, with torsion",
    basis=FROM_MEMORY,
)
END_SUPPORT = _formula(
    "F_le = sqrt((V_f - 0.5*min(V_s, V_f))**2 + (0.45*p_h*T_f/(2*A_o))**2)*cot(theta)",
    clause="11.3.10.6",
    title="Force in the bottom bars at the inner edge of the bearing, with torsion",
    basis=FROM_MEMORY,
)
CORNER_BARS = _criterion(
    "s/16 <= d_b",
    clause="11.2.7",
    title="Bars in the corners of the closed stirrups",
    basis=FROM_MEMORY,
    yes="The corner bars are thick enough.",
    no="The corner bars are NOT thick enough for the spacing of the stirrups.",
    key="corner-bars",
)

FORMULAS = (
    AREA_RECTANGLE, PERIMETER_RECTANGLE, AREA_OF_STIRRUP, PERIMETER_OF_STIRRUP, A_O, T_CR,
    COMPATIBILITY, T_R, LEG_FOR_TORSION, LEGS_FOR_SHEAR, LEGS, SHEAR_IN_STRAIN, EPS_X, LEAST_BARS,
    SHEAR_IN_BARS, TENSION_SIDE, COMPRESSION_SIDE, END_SUPPORT, OVERHANG, AREA_L, PERIMETER_L,
    AREA_T, PERIMETER_T, T_CR_FLANGE, TORQUE, TORQUE_CANTILEVER, LEGS_LEFT,
    FROM_FACE,
)  # fmt: skip
CRITERIA = (COUNTS, STRENGTH, LEGS_PROVIDED, SECTION, CORNER_BARS)
