"""Clause 10.6: distribution of bars (z) and skin reinforcement."""

from __future__ import annotations

from functools import partial

from lineproof.formula import FROM_MEMORY, criterion, formula
from lineproof.sheet import LookupTable
from lineproof.standards.a23_3.notation import NOTATION
from lineproof.standards.references import MECHANICS

_formula = partial(formula, notation=NOTATION)
_criterion = partial(criterion, notation=NOTATION)

LIMITS = LookupTable(
    "Crack control limits",
    "kind of exposure",
    {"z_max": "N/mm", "rho_sk": ""},
    {
        "interior": {"z_max": "30000", "rho_sk": "0.008"},
        "exterior": {"z_max": "25000", "rho_sk": "0.010"},
    },
    "A23.3, 10.6.1 and 10.6.2",
    clause="10.6",
    basis=FROM_MEMORY,
    clauses={"z_max": "10.6.1", "rho_sk": "10.6.2"},
)

STRESS_ALLOWANCE = _formula(
    "f_s = 0.6*f_y",
    clause="10.6.1",
    title="Stress under specified loads, by the allowance",
    basis=FROM_MEMORY,
)
ALLOWANCE_DOES = _criterion(
    "0.6*f_y*(d_c*A_e)**(1/3) <= z_max",
    clause="10.6.1",
    title="Whether 0.6 of the yield stress may stand for the stress of the bars",
    basis=FROM_MEMORY,
    yes="With the allowance the bars are close enough.",
    no="With the allowance they are not: the stress under specified loads is calculated.",
    key="stress-allowance",
)
STRESS = _formula(
    "f_s = n_E*M_s*(d - kd)/I_cr",
    clause="10.6.1",
    title="Stress under specified loads, cracked section",
    basis=MECHANICS,
)
D_C = _formula(
    "d_c = c_c + d_bs + d_b/2",
    clause="10.6.1",
    title="Tension face to the centre of the nearest bar",
    basis=FROM_MEMORY,
)
D_S = _formula(
    "d_s = h - d",
    clause="10.6.1",
    title="Tension face to the centroid of the bars",
    basis=FROM_MEMORY,
)
BAR_COUNT = _formula(
    "n_z = A_s/A_b",
    clause="10.6.1",
    title="Number of bars: total area over area of the largest",
    basis=FROM_MEMORY,
)
TENSION_AREA = _formula(
    "A_e = 2*d_s*b_w/n_z",
    clause="10.6.1",
    title="Concrete in tension around each bar, same centroid as the bars",
    basis=FROM_MEMORY,
)
TENSION_AREA_T = _formula(
    "A_e = 2*d_s*(b_w + 2*b_ot)/n_z",
    clause="10.6.1",
    title="Concrete in tension around each top bar, web and both overhangs",
    basis=MECHANICS,
)
TENSION_AREA_L = _formula(
    "A_e = 2*d_s*(b_w + b_ot)/n_z",
    clause="10.6.1",
    title="Concrete in tension around each top bar, web and overhang",
    basis=MECHANICS,
)
COATED_LIMIT = _formula(
    "z_max = z_mu/1.2",
    clause="10.6.1",
    title="Largest allowed z of coated bars, whose z counts 1.2 times",
    basis=FROM_MEMORY,
)
Z = _formula(
    "z = f_s*(d_c*A_e)**(1/3)",
    clause="10.6.1",
    title="Crack control parameter",
    basis=FROM_MEMORY,
)
CRACKS = _criterion(
    "z <= z_max",
    clause="10.6.1",
    title="Crack control",
    basis=FROM_MEMORY,
    yes="The bars are close enough to control cracks.",
    no="The bars are NOT close enough to control cracks: more and thinner bars.",
    key="crack-control",
)
NEEDS_SKIN = _criterion(
    "h > 750",
    clause="10.6.2",
    title="Whether skin reinforcement is required",
    basis=FROM_MEMORY,
    numbers={"750": "mm"},
    yes="Deeper than 750 mm: skin reinforcement is required on both faces.",
    no="Not deeper than 750 mm: no skin reinforcement is required.",
    key="skin-required",
)
SKIN_HEIGHT = _formula(
    "h_sk = max(0.5*h - 2*(h - d), 0)",
    clause="10.6.2",
    title="Height of the strips",
    basis=FROM_MEMORY,
)
SKIN_WIDTH = _formula(
    "b_sk = min(2*d_sk, b_w/2)",
    clause="10.6.2",
    title="Width of one strip",
    basis=FROM_MEMORY,
)
SKIN_STRIPS = _formula(
    "A_cs = 2*h_sk*b_sk",
    clause="10.6.2",
    title="Area of both strips",
    basis=FROM_MEMORY,
)
SKIN_AREA = _formula(
    "A_sk = rho_sk*A_cs",
    clause="10.6.2",
    title="Skin reinforcement, both faces",
    basis=FROM_MEMORY,
)
SKIN_SPACING_MOST = 200.0
"""Largest spacing of skin bars [mm], 10.6.2 (from memory)."""

SKIN_DEPTH = _formula(
    "d_sk = c_c + d_bs + d_b/2",
    clause="10.6.2",
    title="Side face to the centre of the skin bars",
    basis=FROM_MEMORY,
)
SKIN_PROVIDED = _criterion(
    "A_sk <= 2*n_k*A_bk",
    clause="10.6.2",
    title="Skin reinforcement provided",
    basis=FROM_MEMORY,
    yes="The skin bars provide the area.",
    no="The skin bars do NOT provide the area.",
    key="skin-area",
)
SKIN_SPACING = _formula(
    "s_sk = h_sk/n_k",
    clause="10.6.2",
    title="Spacing of the skin bars over the height of the strips",
    basis=FROM_MEMORY,
)
SKIN_CLOSE = _criterion(
    "s_sk <= 200",
    clause="10.6.2",
    title="Spacing of the skin bars",
    basis=FROM_MEMORY,
    numbers={"200": "mm"},
    yes="The skin bars are close enough.",
    no="The skin bars are NOT close enough.",
    key="skin-spacing",
)

FORMULAS = (
    STRESS_ALLOWANCE,
    STRESS,
    D_C,
    D_S,
    BAR_COUNT,
    TENSION_AREA,
    TENSION_AREA_T,
    TENSION_AREA_L,
    COATED_LIMIT,
    Z,
    SKIN_HEIGHT,
    SKIN_WIDTH,
    SKIN_STRIPS,
    SKIN_AREA,
    SKIN_DEPTH,
    SKIN_SPACING,
)
CRITERIA = (ALLOWANCE_DOES, CRACKS, NEEDS_SKIN, SKIN_PROVIDED, SKIN_CLOSE)
TABLES = (LIMITS,)
