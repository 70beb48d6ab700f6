"""Clause 11.5: interface shear, and the plane where flange and web meet."""

from __future__ import annotations

from functools import partial

from lineproof.formula import COMMON_PRACTICE, FROM_MEMORY, criterion, formula
from lineproof.sheet import LookupTable
from lineproof.standards.a23_3.notation import NOTATION
from lineproof.standards.references import MECHANICS

_formula = partial(formula, notation=NOTATION)
_criterion = partial(criterion, notation=NOTATION)

SURFACES = LookupTable(
    "Interface shear: cohesion and friction",
    "surface of the shear plane",
    {"c_v": "MPa", "mu": ""},
    {
        "clean, smooth": {"c_v": "0.25", "mu": "0.60"},
        "clean, roughened to 5 mm": {"c_v": "0.50", "mu": "1.00"},
        "monolithic": {"c_v": "1.00", "mu": "1.40"},
        "rolled steel": {"c_v": "0", "mu": "0.60"},
    },
    "A23.3, 11.5.2",
    clause="11.5.2",
    basis=FROM_MEMORY,
)
ALTERNATIVE_FACTORS = LookupTable(
    "Interface shear: factor of the alternative expression",
    "casting of the shear plane",
    {"k_i": ""},
    {"against hardened concrete": {"k_i": "0.5"}, "monolithic": {"k_i": "0.6"}},
    "A23.3, 11.5.3",
    clause="11.5.3",
    basis=FROM_MEMORY,
)

BARS_ACROSS = _formula(
    "A_vf = n_f*A_b",
    clause="11.5",
    title="Area of transverse bars across the plane, in one spacing",
    basis=MECHANICS,
)
RATIO = _formula(
    "rho_v = A_vf/A_cv",
    clause="11.5",
    title="Ratio of bars across the plane",
    basis=FROM_MEMORY,
)
RATIO_FLANGE = _formula(
    "rho_v = A_vf/(s_f*h_f)",
    clause="11.5",
    title="Ratio of transverse bars across the plane of flange and web",
    basis=FROM_MEMORY,
)
COMPRESSION = _formula(
    "sigma = rho_v*f_y",
    clause="11.5",
    title="Compression across the plane, bars square to it",
    basis=FROM_MEMORY,
)
COMPRESSION_INCLINED = _formula(
    "sigma = rho_v*f_y*sin(alpha_f)",
    clause="11.5",
    title="Compression across the plane, inclined bars",
    basis=FROM_MEMORY,
)
RESISTANCE = _formula(
    "v_r = min(lambda_*phi_c*(c_v + mu*sigma), 0.25*phi_c*f_c)",
    clause="11.5",
    title="Interface shear resistance, bars square to the plane",
    basis=FROM_MEMORY,
)
RESISTANCE_INCLINED = _formula(
    "v_r = min(lambda_*phi_c*(c_v + mu*sigma), 0.25*phi_c*f_c) + phi_s*rho_v*f_y*cos(alpha_f)",
    clause="11.5",
    title="Interface shear resistance, inclined bars",
    basis=FROM_MEMORY,
)
RESISTANCE_ALTERNATIVE = _formula(
    "v_r = min(lambda_*phi_c*k_i*sqrt(sigma*f_c), 0.25*phi_c*f_c)",
    clause="11.5.3",
    title="Interface shear resistance, alternative, bars square to the plane",
    basis=FROM_MEMORY,
)
OVERHANG_IN_FLANGE = _formula(
    "F_o = phi_s*A_s*f_y*b_o/b",
    clause="11.5",
    title="Compression in one overhang, the block staying in the flange",
    basis=MECHANICS,
)
OVERHANG_BLOCK_IN_WEB = _formula(
    "F_o = C_f*b_o/(b - b_w)",
    clause="11.5",
    title="Compression in one overhang, the block reaching into the web",
    basis=MECHANICS,
)
OVERHANG_TENSION = _formula(
    "F_o = phi_s*n_o*A_b*f_y*min(M_f/M_r, 1)",
    clause="11.5",
    title="Tension in one overhang by the top bars in it, with the moment, at most at yield",
    basis=MECHANICS,
)
OVERHANG_TENSION_IN_PART = _formula(
    "F_o = phi_s*n_o*A_b*min(l_av/l_d, 1)*f_y*min(M_f/M_r, 1)",
    clause="11.5",
    title="Tension in one overhang by the top bars in it, as far as developed, with the moment",
    basis=MECHANICS,
)
LENGTH = _formula(
    "l_vf = abs(x_vz - x_vm)",
    clause="11.5",
    title="Length from the largest moment to zero moment",
    basis=MECHANICS,
)
LENGTH_RESTRAINED = _formula(
    "l_vf = max(2*l/n_rm - b_sp/2, l/n_rm)",
    clause="11.5",
    title="Length from the face to where the moment of restraint is zero, at least half of it",
    basis=MECHANICS,
)
LENGTH_QUARTER = _formula(
    "l_vf = l_n/4",
    clause="11.5",
    title="Length where the moment is zero nowhere in the span: a quarter of the clear span",
    basis=COMMON_PRACTICE,
)
STRESS = _formula(
    "v_f = F_o/(h_f*l_vf)",
    clause="11.5",
    title="Shear stress where flange and web meet",
    basis=MECHANICS,
)
STRENGTH = _criterion(
    "v_f <= v_r",
    clause="11.5",
    title="Interface shear",
    basis=FROM_MEMORY,
    yes="The shear plane carries the shear.",
    no="The shear plane does NOT carry the shear: more bars across it.",
    key="interface-shear",
)

FORMULAS = (
    BARS_ACROSS,
    RATIO,
    RATIO_FLANGE,
    COMPRESSION,
    COMPRESSION_INCLINED,
    RESISTANCE,
    RESISTANCE_INCLINED,
    RESISTANCE_ALTERNATIVE,
    OVERHANG_IN_FLANGE,
    OVERHANG_BLOCK_IN_WEB,
    OVERHANG_TENSION,
    OVERHANG_TENSION_IN_PART,
    LENGTH,
    LENGTH_RESTRAINED,
    LENGTH_QUARTER,
    STRESS,
)
CRITERIA = (STRENGTH,)
TABLES = (SURFACES, ALTERNATIVE_FACTORS)
