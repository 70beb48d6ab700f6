"""Clause 9.8: span-depth table, effective inertia, long-term deflections and their limits.

The modulus of rupture for deflections is half of 8.6.4 (A23.3-14).  Midspan takes the T section,
a support in negative moment the web: ``b`` is the width of the compression zone at the section.
"""

from __future__ import annotations

from functools import partial

from lineproof.formula import FROM_MEMORY, criterion, formula
from lineproof.sheet import LookupTable
from lineproof.standards.a23_3.notation import NOTATION as A23_3
from lineproof.standards.nbc.notation import NOTATION as NBC
from lineproof.standards.references import DEFLECTION_QUOTED, LONG_TERM_PAPER, MECHANICS

_formula = partial(formula, notation=A23_3 | NBC)
_criterion = partial(criterion, notation=A23_3 | NBC)

SPAN_DEPTH = LookupTable(
    "Least depth without calculation of deflections: divisors",
    "member and continuity of the span-depth table",
    {"k_h": ""},
    {
        "beam, simply supported": {"k_h": "16"},
        "beam, one end continuous": {"k_h": "18"},
        "beam, both ends continuous": {"k_h": "21"},
        "beam, cantilever": {"k_h": "8"},
        "slab, simply supported": {"k_h": "20"},
        "slab, one end continuous": {"k_h": "24"},
        "slab, both ends continuous": {"k_h": "28"},
        "slab, cantilever": {"k_h": "10"},
    },
    "A23.3, Table 9.2",
    clause="9.8.2.1",
    basis=FROM_MEMORY,
)
DURATIONS = LookupTable(
    "Factor for the duration of sustained load",
    "duration of the sustained load",
    {"S_t": ""},
    {
        "3 months": {"S_t": "1.0"},
        "6 months": {"S_t": "1.2"},
        "12 months": {"S_t": "1.4"},
        "5 years or more": {"S_t": "2.0"},
    },
    "A23.3, 9.8.2.5",
    clause="9.8.2.5",
    basis=LONG_TERM_PAPER,
)
LIMITS = LookupTable(
    "Largest deflections: divisors",
    "kind of member of the deflection limits",
    {"k_D": ""},
    {
        "flat roof, nothing attached that deflection damages": {"k_D": "180"},
        "floor, nothing attached that deflection damages": {"k_D": "360"},
        "roof or floor with parts attached that deflection damages": {"k_D": "480"},
        "roof or floor with parts attached that deflection spares": {"k_D": "240"},
    },
    "A23.3, Table 9.3",
    clause="9.8.2.6",
    basis=FROM_MEMORY,
)

STEEL_MODIFIER = _formula(
    "k_fy = max(0.4 + f_y/670, 1)",
    clause="9.8.2.1",
    title="Modifier of the least depth for the strength of the bars, none for 400 MPa",
    basis=FROM_MEMORY,
    numbers={"670": "MPa"},
)
DENSITY_MODIFIER = _formula(
    "k_gc = max(1.65 - 0.3*gamma_c/1000, 1)",
    clause="9.8.2.1",
    title="Modifier of the least depth for low density",
    basis=FROM_MEMORY,
    numbers={"1000": "kg/m3"},
)
LEAST_DEPTH = _formula(
    "h_min = l_n/k_h",
    clause="9.8.2.1",
    title="Least depth without calculation, 400 MPa and normal density",
    basis=FROM_MEMORY,
)
LEAST_DEPTH_MODIFIED = _formula(
    "h_min = l_n/k_h*k_fy*k_gc",
    clause="9.8.2.1",
    title="Least depth without calculation, modified",
    basis=FROM_MEMORY,
)
DEEP_ENOUGH = _criterion(
    "h_min <= h",
    clause="9.8.2.1",
    title="Whether deflections need be calculated, nothing attached that they damage",
    basis=FROM_MEMORY,
    yes="Deep enough: deflections need not be calculated.",
    no="Not that deep: deflections are calculated.",
    key="span-depth",
)

F_R_DEFLECTION = _formula(
    "f_rd = 0.5*f_r",
    clause="9.8.2.3",
    title="Modulus of rupture for deflections, half of 8.6.4",
    basis=DEFLECTION_QUOTED,
)
CRACKING_BOTTOM = _formula(
    "M_crd = f_rd*I_g/y_b",
    clause="9.8.2.3",
    title="Cracking moment for deflections, positive bending",
    basis=DEFLECTION_QUOTED,
)
CRACKING_TOP = _formula(
    "M_crdn = f_rd*I_g/y_t",
    clause="9.8.2.3",
    title="Cracking moment for deflections, negative bending",
    basis=DEFLECTION_QUOTED,
)
MODULAR_RATIO = _formula("n_E = E_s/E_c", clause="9.8.2.3", title="Modular ratio", basis=MECHANICS)
AXIS = _formula(
    "kd = n_E*A_s/b*(sqrt(1 + 2*b*d/(n_E*A_s)) - 1)",
    clause="9.8.2.3",
    title="Neutral axis of the cracked section, width b",
    basis=MECHANICS,
)
AXIS_COMPRESSION_BARS = _formula(
    "kd = (sqrt((n_E*A_s + (n_E - 1)*A_sp)**2 + 2*b*(n_E*A_s*d + (n_E - 1)*A_sp*d_p))"
    " - n_E*A_s - (n_E - 1)*A_sp)/b",
    clause="9.8.2.3",
    title="Neutral axis of the cracked section, compression bars counted",
    basis=MECHANICS,
)
AXIS_IN_FLANGE = _criterion(
    "kd <= h_f",
    clause="9.8.2.3",
    title="Where the neutral axis of the cracked section lies",
    basis=MECHANICS,
    yes="The axis lies in the flange: the section acts as a rectangle of width b.",
    no="The axis lies in the web: flange and web are taken apart.",
    key="cracked-axis-in-flange",
)
AXIS_IN_WEB = _formula(
    "kd_w = (sqrt(((b - b_w)*h_f + n_E*A_s)**2 + b_w*((b - b_w)*h_f**2 + 2*n_E*A_s*d))"
    " - (b - b_w)*h_f - n_E*A_s)/b_w",
    clause="9.8.2.3",
    title="Neutral axis of the cracked section, flange and web",
    basis=MECHANICS,
)
CRACKED = _formula(
    "I_cr = b*kd**3/3 + n_E*A_s*(d - kd)**2",
    clause="9.8.2.3",
    title="Moment of inertia of the cracked section, width b",
    basis=MECHANICS,
)
CRACKED_COMPRESSION_BARS = _formula(
    "I_cr = b*kd**3/3 + n_E*A_s*(d - kd)**2 + (n_E - 1)*A_sp*(kd - d_p)**2",
    clause="9.8.2.3",
    title="Moment of inertia of the cracked section, compression bars counted",
    basis=MECHANICS,
)
CRACKED_TEE = _formula(
    "I_cr = (b - b_w)*h_f**3/12 + (b - b_w)*h_f*(kd_w - h_f/2)**2 + b_w*kd_w**3/3"
    " + n_E*A_s*(d - kd_w)**2",
    clause="9.8.2.3",
    title="Moment of inertia of the cracked section, flange and web",
    basis=MECHANICS,
)
MOMENT_SIMPLE = _formula(
    "M_a = w_s*l**2/8",
    clause="9.8.2.3",
    title="Moment at midspan due to the specified load, simple span",
    basis=MECHANICS,
    system="kN-m",
)
EFFECTIVE = _formula(
    "I_e = min(I_cr + (I_g - I_cr)*(M_crd/M_a)**3, I_g)",
    clause="9.8.2.3",
    title="Effective moment of inertia, positive bending",
    basis=DEFLECTION_QUOTED,
)
EFFECTIVE_TOP = _formula(
    "I_e = min(I_cr + (I_g - I_cr)*(M_crdn/M_a)**3, I_g)",
    clause="9.8.2.3",
    title="Effective moment of inertia, negative bending",
    basis=DEFLECTION_QUOTED,
)
BOTH_ENDS = _formula(
    "I_ea = 0.7*I_em + 0.15*(I_e1 + I_e2)",
    clause="9.8.2.4",
    title="Average over the span, both ends continuous",
    basis=FROM_MEMORY,
)
ONE_END = _formula(
    "I_ea = 0.85*I_em + 0.15*I_ec",
    clause="9.8.2.4",
    title="Average over the span, one end continuous",
    basis=FROM_MEMORY,
)

COMPRESSION_RATIO = _formula(
    "rho_p = A_sp/(b*d)",
    clause="9.8.2.5",
    title="Ratio of compression reinforcement, at midspan (cantilever: at the support)",
    basis=FROM_MEMORY,
)
LONG_TERM = _formula(
    "zeta_s = 1 + S_t/(1 + 50*rho_p)",
    clause="9.8.2.5",
    title="Total over immediate deflection under sustained load",
    basis=FROM_MEMORY,
)
LONG_TERM_ATTACHED = _formula(
    "zeta_sa = 1 + S_t/(1 + 50*rho_p)",
    clause="9.8.2.5",
    title="Total over immediate deflection when the parts are attached",
    basis=FROM_MEMORY,
)
SIMPLE_SPAN = _formula(
    "delta_i = 5*w_s*l**4/(384*E_c*I_e)",
    clause="9.8.2.2",
    title="Immediate deflection, simple span",
    basis=MECHANICS,
)
CANTILEVER = _formula(
    "delta_i = w_s*l**4/(8*E_c*I_e)",
    clause="9.8.2.2",
    title="Immediate deflection, cantilever",
    basis=MECHANICS,
)
CONTINUOUS_SPAN = _formula(
    "delta_i = 5*l**2/(48*E_c*I_ea)*(M_m - 0.1*(M_h1 + M_h2))",
    clause="9.8.2.2",
    title="Immediate deflection at midspan from moments, uniform load",
    basis=MECHANICS,
)
LIVE = _formula(
    "delta_L = delta_DL - delta_D",
    clause="9.8.2.6",
    title="Immediate deflection due to live load",
    basis=MECHANICS,
)
REST_OF_LIVE = _formula(
    "delta_Lr = delta_DL - delta_sus",
    clause="9.8.2.6",
    title="Immediate deflection due to the live load not sustained",
    basis=MECHANICS,
)
TOTAL = _formula(
    "delta_t = zeta_s*delta_sus + delta_Lr",
    clause="9.8.2.5",
    title="Total deflection",
    basis=FROM_MEMORY,
)
AFTER_ATTACHMENT = _formula(
    "delta_at = (zeta_s - zeta_sa)*delta_sus + delta_Lr",
    clause="9.8.2.6",
    title="Deflection after attachment of the parts carried",
    basis=FROM_MEMORY,
)
LARGEST = _formula(
    "delta_max = l_n/k_D",
    clause="9.8.2.6",
    title="Largest deflection allowed",
    basis=FROM_MEMORY,
)
LIVE_SMALL = _criterion(
    "delta_L <= delta_max",
    clause="9.8.2.6",
    title="Deflection due to live load",
    basis=FROM_MEMORY,
    yes="The deflection due to live load stays within the limit.",
    no="The deflection due to live load EXCEEDS the limit.",
    key="deflection-live",
)
ATTACHED_SMALL = _criterion(
    "delta_at <= delta_max",
    clause="9.8.2.6",
    title="Deflection after attachment",
    basis=FROM_MEMORY,
    yes="The deflection after attachment stays within the limit.",
    no="The deflection after attachment EXCEEDS the limit.",
    key="deflection-attached",
)

FORMULAS = (
    STEEL_MODIFIER, DENSITY_MODIFIER, LEAST_DEPTH, LEAST_DEPTH_MODIFIED, F_R_DEFLECTION,
    CRACKING_BOTTOM, CRACKING_TOP, MODULAR_RATIO, AXIS, AXIS_COMPRESSION_BARS, AXIS_IN_WEB, CRACKED,
    CRACKED_COMPRESSION_BARS, CRACKED_TEE, MOMENT_SIMPLE, EFFECTIVE, EFFECTIVE_TOP, BOTH_ENDS,
    ONE_END, COMPRESSION_RATIO, LONG_TERM, LONG_TERM_ATTACHED, SIMPLE_SPAN, CANTILEVER,
    CONTINUOUS_SPAN, LIVE, REST_OF_LIVE, TOTAL, AFTER_ATTACHMENT, LARGEST,
)  # fmt: skip
CRITERIA = (DEEP_ENOUGH, AXIS_IN_FLANGE, LIVE_SMALL, ATTACHED_SMALL)
TABLES = (SPAN_DEPTH, DURATIONS, LIMITS)
