"""Clauses 12.2 to 12.4: development of straight bars in tension and compression, bundles."""

from __future__ import annotations

from functools import partial

from lineproof.formula import FROM_MEMORY, criterion, formula
from lineproof.sheet import LookupTable
from lineproof.standards.a23_3.notation import NOTATION
from lineproof.standards.references import DEVELOPMENT_GUIDE, MECHANICS

_formula = partial(formula, notation=NOTATION)
_criterion = partial(criterion, notation=NOTATION)

LOCATION = LookupTable(
    "Development: bar location factor",
    "location of the bar",
    {"k_1": ""},
    {
        "more than 300 mm of fresh concrete below": {"k_1": "1.3"},
        "other": {"k_1": "1.0"},
    },
    "A23.3, 12.2.4(a)",
    clause="12.2.4",
    basis=FROM_MEMORY,
)
COATING = LookupTable(
    "Development: coating factor",
    "coating of the bar",
    {"k_2": ""},
    {
        "epoxy, cover below 3 bar diameters or clear spacing below 6": {"k_2": "1.5"},
        "epoxy, other": {"k_2": "1.2"},
        "none": {"k_2": "1.0"},
    },
    "A23.3, 12.2.4(b)",
    clause="12.2.4",
    basis=FROM_MEMORY,
)
COATED_CLOSE, COATED, UNCOATED = COATING.rows
COATED_COVERED = _criterion(
    "3*d_b <= c_b1",
    clause="12.2.4",
    title="Coated bars: cover of at least three bar diameters",
    basis=FROM_MEMORY,
    yes="The cover is at least three bar diameters.",
    no="The cover is below three bar diameters: the larger factor.",
    key="coated-cover",
)
COATED_SPACED = _criterion(
    "6*d_b <= s_c",
    unit="mm",
    clause="12.2.4",
    title="Coated bars: clear distance of at least six bar diameters",
    basis=FROM_MEMORY,
    yes="The bars are at least six diameters apart.",
    no="The bars are less than six diameters apart: the larger factor.",
    key="coated-spacing",
)
DENSITY = LookupTable(
    "Development: concrete density factor",
    "density of concrete",
    {"k_3": ""},
    {"normal": {"k_3": "1.0"}, "semi-low": {"k_3": "1.2"}, "low": {"k_3": "1.3"}},
    "A23.3, 12.2.4(c)",
    clause="12.2.4",
    basis=FROM_MEMORY,
)
SIZE = LookupTable(
    "Development: bar size factor",
    "Canadian bar",
    {"k_4": ""},
    {size: {"k_4": "0.8"} for size in ("10M", "15M", "20M")}
    | {size: {"k_4": "1.0"} for size in ("25M", "30M", "35M", "45M", "55M")},
    "A23.3, 12.2.4(d)",
    clause="12.2.4",
    basis=DEVELOPMENT_GUIDE,
)
BUNDLES = LookupTable(
    "Development: bars in a bundle",
    "number of bars in the bundle",
    {"k_bu": ""},
    {"2": {"k_bu": "1.10"}, "3": {"k_bu": "1.20"}, "4": {"k_bu": "1.33"}},
    "A23.3, 12.4",
    clause="12.4",
    basis=FROM_MEMORY,
)

TOP_BAR = _criterion(
    "h_u > 300",
    clause="12.2.4",
    title="Whether the bars are top bars",
    basis=FROM_MEMORY,
    numbers={"300": "mm"},
    yes="More than 300 mm of fresh concrete is cast below the bars: top bars.",
    no="Not more than 300 mm of fresh concrete is cast below the bars.",
    key="top-bars",
)
FRESH_BELOW = _formula(
    "h_u = h - c_c - d_bs - d_b",
    clause="12.2.4",
    title="Depth of fresh concrete cast below the top bars",
    basis=MECHANICS,
)
CLEAR_OVERHANG = _formula(
    "s_c = b_ot/n_o - d_b",
    clause="12.2.3",
    title="Clear distance between the bars spread over the overhang",
    basis=MECHANICS,
)
TO_SURFACE = _formula(
    "d_cn = c_c + d_bs + d_b/2",
    clause="2.3",
    title="Centre of the bar to the nearest concrete surface",
    basis=MECHANICS,
)
A_TR = _formula(
    "A_tr = n_v*A_bs",
    clause="12.2.2",
    title="Area of the stirrup legs across the splitting plane",
    basis=MECHANICS,
)
CENTRES = _formula(
    "s_bb = s_c + d_b",
    clause="12.2.2",
    title="Distance between the bars, centre to centre",
    basis=MECHANICS,
)
D_CS = _formula(
    "d_cs = min(d_cn, 2/3*s_bb)",
    clause="2.3",
    title="Distance that governs splitting",
    basis=FROM_MEMORY,
)
K_TR = _formula(
    "K_tr = A_tr*f_yt/(10.5*s*n_d)",
    clause="12.2.2",
    title="Transverse reinforcement index",
    basis=FROM_MEMORY,
    numbers={"10.5": "MPa"},
)
GENERAL = _formula(
    "l_d0 = 1.15*min(k_1*k_2, 1.7)*k_3*k_4*f_y*A_b/(min(d_cs + K_tr, 2.5*d_b)*min(sqrt(f_c), 8))",
    clause="12.2.2",
    title="Development length, general expression, before reduction and least length",
    basis=DEVELOPMENT_GUIDE,
    numbers={"1.15": "1/MPa^0.5", "8": "MPa^0.5"},
)
COVERED = _criterion(
    "d_b <= c_b1",
    clause="12.2.3",
    title="Short expression: cover of at least a bar diameter",
    basis=FROM_MEMORY,
    yes="The cover is at least a bar diameter.",
    no="The cover is below a bar diameter: the longer expression.",
    key="development-cover",
)
SPACED = _criterion(
    "1.4*d_b <= s_c",
    unit="mm",
    clause="12.2.3",
    title="Short expression: clear distance between the bars, with stirrups",
    basis=FROM_MEMORY,
    yes="The bars are far enough apart.",
    no="The bars are too close: the longer expression.",
    key="development-spacing",
)
SPACED_SLAB = _criterion(
    "2*d_b <= s_c",
    unit="mm",
    clause="12.2.3",
    title="Short expression: clear distance between the bars, slab",
    basis=FROM_MEMORY,
    yes="The bars are far enough apart.",
    no="The bars are too close: the longer expression.",
    key="development-spacing",
)
SHORT = _formula(
    "l_d0 = 0.45*min(k_1*k_2, 1.7)*k_3*k_4*f_y/min(sqrt(f_c), 8)*d_b",
    clause="12.2.3",
    title="Development length by the table, before reduction and least length",
    basis=FROM_MEMORY,
    numbers={"0.45": "1/MPa^0.5", "8": "MPa^0.5"},
)
LONG = _formula(
    "l_d0 = 0.60*min(k_1*k_2, 1.7)*k_3*k_4*f_y/min(sqrt(f_c), 8)*d_b",
    clause="12.2.3",
    title="Development length by the table, other cases, before reduction and least length",
    basis=FROM_MEMORY,
    numbers={"0.60": "1/MPa^0.5", "8": "MPa^0.5"},
)
L_D = _formula(
    "l_d = max(l_d0, 300)",
    clause="12.2.1",
    title="Development length",
    basis=DEVELOPMENT_GUIDE,
    numbers={"300": "mm"},
)
L_D_EXCESS = _formula(
    "l_d = max(l_d0*min(A_sr/A_s, 1), 300)",
    clause="12.2.5",
    title="Development length, more steel than required",
    basis=FROM_MEMORY,
    numbers={"300": "mm"},
)
L_D_BUNDLE = _formula(
    "l_d = max(k_bu*l_d0, 300)",
    clause="12.4",
    title="Development length of a bar in a bundle",
    basis=FROM_MEMORY,
    numbers={"300": "mm"},
)
DEVELOPED = _criterion(
    "l_d <= l_av",
    clause="12.1",
    title="Development of the bars",
    basis=FROM_MEMORY,
    yes="The bars develop their yield strength.",
    no="The bars do NOT develop their yield strength.",
    key="development",
)
IN_PART = _criterion(
    "l_av < l_d",
    clause="12.2.5",
    title="Whether the bars are developed in part",
    basis=FROM_MEMORY,
    yes="Of the area of the bars as much counts as the first length is of the second, at the face "
    "of the support and wherever else they are used: more steel than required lets the length be "
    "shorter.",
    no="The bars are developed in full.",
    key="development-in-part",
)
DEVELOPED_AREA = _formula(
    "A_sd = A_s*min(l_av/l_d, 1)",
    clause="11.3.6.4",
    title="Area of the bars, counted as far as developed",
    basis=FROM_MEMORY,
)

DEVELOPED_TOTAL = _formula(
    "A_sd = A_sd1 + A_sd2",
    clause="11.3.6.4",
    title="Area of all bars, counted as far as developed",
    basis=MECHANICS,
)

COMPRESSION_BASIC = _formula(
    "l_db = max(0.24*d_b*f_y/min(sqrt(f_c), 8), 0.044*d_b*f_y)",
    clause="12.3.2",
    title="Basic development length in compression",
    basis=FROM_MEMORY,
    numbers={"0.24": "1/MPa^0.5", "8": "MPa^0.5", "0.044": "1/MPa"},
)
COMPRESSION = _formula(
    "l_dc = max(l_db, 200)",
    clause="12.3.1",
    title="Development length in compression",
    basis=FROM_MEMORY,
    numbers={"200": "mm"},
)
COMPRESSION_TIED = _formula(
    "l_dc = max(0.75*l_db, 200)",
    clause="12.3.3",
    title="Development length in compression, enclosed in ties",
    basis=FROM_MEMORY,
    numbers={"200": "mm"},
)
DEVELOPED_COMPRESSION = _criterion(
    "l_dc <= l_av",
    clause="12.3",
    title="Development of the compression bars",
    basis=FROM_MEMORY,
    yes="The compression bars develop their yield strength.",
    no="The compression bars do NOT develop their yield strength.",
    key="development-compression",
)

FORMULAS = (
    FRESH_BELOW, CLEAR_OVERHANG, TO_SURFACE, A_TR, CENTRES, D_CS, K_TR, GENERAL, SHORT, LONG, L_D,
    L_D_EXCESS, L_D_BUNDLE, DEVELOPED_AREA, DEVELOPED_TOTAL, COMPRESSION_BASIC, COMPRESSION,
    COMPRESSION_TIED,
)  # fmt: skip
CRITERIA = (
    TOP_BAR, COATED_COVERED, COATED_SPACED, COVERED, SPACED, SPACED_SLAB, DEVELOPED, IN_PART,
    DEVELOPED_COMPRESSION,
)  # fmt: skip
TABLES = (LOCATION, COATING, DENSITY, SIZE, BUNDLES)
