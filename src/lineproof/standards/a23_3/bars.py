"""Canadian bars, their spacing within and between layers, and the depth to them."""

from __future__ import annotations

from functools import partial

from lineproof.formula import FROM_MEMORY, criterion, formula
from lineproof.sheet import LookupTable
from lineproof.standards.a23_3.notation import NOTATION
from lineproof.standards.references import G30_18_TABLE, MECHANICS

_formula = partial(formula, notation=NOTATION)
_criterion = partial(criterion, notation=NOTATION)

BARS = LookupTable(
    "Reinforcing bars",
    "Canadian bar",
    {"d_b": "mm", "A_b": "mm2"},
    {
        "10M": {"d_b": "11.3", "A_b": "100"},
        "15M": {"d_b": "16.0", "A_b": "200"},
        "20M": {"d_b": "19.5", "A_b": "300"},
        "25M": {"d_b": "25.2", "A_b": "500"},
        "30M": {"d_b": "29.9", "A_b": "700"},
        "35M": {"d_b": "35.7", "A_b": "1000"},
        "45M": {"d_b": "43.7", "A_b": "1500"},
        "55M": {"d_b": "56.4", "A_b": "2500"},
    },
    "CSA G30.18",
    clause="G30.18",
    basis=G30_18_TABLE,
)
STIRRUP_BENDS = LookupTable(
    "Inside radius of stirrup bends",
    "stirrup size",
    {"r_s": "mm"},
    {"10M": {"r_s": "22.5"}, "15M": {"r_s": "32.5"}},
    "CSA A23.1, 6.6.2 (bend diameters 45 and 65 mm)",
    clause="A23.1 6.6.2",
    basis=FROM_MEMORY,
)
GRADES = LookupTable(
    "Grades of reinforcement",
    "grade of reinforcement",
    {"f_y": "MPa"},
    {grade: {"f_y": grade[:3]} for grade in ("400R", "400W", "500R", "500W")},
    "CSA G30.18",
    clause="G30.18",
    basis=G30_18_TABLE,
)

LEAST_CLEAR = _formula(
    "s_min = max(1.4*d_b, 1.4*a_max, 30)",
    clause="A23.1 6.6.5.2",
    title="Least clear distance between bars",
    basis=FROM_MEMORY,
    numbers={"30": "mm"},
)
CLEAR = _formula(
    "s_c = (b_w - 2*(c_c + d_bs + max(r_s, d_b/2)))/(n_b - 1) - d_b",
    clause="A23.1 6.6.5.2",
    title="Clear distance between bars, corner bars in the bend of the stirrup",
    basis=MECHANICS,
)
FITS = _criterion(
    "s_min <= s_c",
    clause="A23.1 6.6.5.2",
    title="Bars fit into the layer",
    basis=FROM_MEMORY,
    yes="The bars fit.",
    no="The bars do NOT fit: fewer or larger bars, two layers or a wider web.",
    key="bars-fit",
)
FITS_SECOND = _criterion(
    "s_min2 <= s_c2",
    clause="A23.1 6.6.5.2",
    title="Bars fit into the second layer",
    basis=FROM_MEMORY,
    yes="The bars of the second layer fit.",
    no="The bars of the second layer do NOT fit: fewer or larger bars, or a wider web.",
    key="bars-fit-2",
)
FITS_OVERHANG = _criterion(
    "s_mino <= s_co",
    clause="A23.1 6.6.5.2",
    title="Bars fit into the overhang",
    basis=FROM_MEMORY,
    yes="The bars in the overhang fit.",
    no="The bars in the overhang do NOT fit: fewer or larger bars there.",
    key="bars-fit-overhang",
)
DEPTH_FIRST = _formula(
    "d_1 = h - c_c - d_bs - d_b/2",
    title="Depth to the first layer",
    clause="geometry",
    basis=MECHANICS,
)
LAYER_DISTANCE = _formula(
    "s_l = max(1.4*d_b, 1.4*a_max, 30)",
    clause="A23.1 6.6.5.2",
    title="Clear distance between layers, bars in line",
    basis=FROM_MEMORY,
    numbers={"30": "mm"},
)
DEPTH_SECOND = _formula(
    "d_2 = d_1 - d_b/2 - s_l - d_b2/2",
    unit="mm",
    title="Depth to the second layer",
    clause="geometry",
    basis=MECHANICS,
)
DEPTH_TWO_LAYERS = _formula(
    "d = (A_s1*d_1 + A_s2*d_2)/(A_s1 + A_s2)",
    title="Effective depth, to the centroid of the bars",
    clause="geometry",
    basis=MECHANICS,
)
TOP_AREA_T = _formula(
    "A_s = (n_t + 2*n_o)*A_b",
    title="Area of the top bars, web and both overhangs",
    clause="10.5.3.1",
    basis=MECHANICS,
)
TOP_AREA_L = _formula(
    "A_s = (n_t + n_o)*A_b",
    title="Area of the top bars, web and overhang",
    clause="10.5.3.1",
    basis=MECHANICS,
)
TOP_AREA_RECTANGULAR = _formula(
    "A_s = n_t*A_b", title="Area of the top bars", clause="G30.18", basis=MECHANICS
)
COMPRESSION_AREA = _formula(
    "A_sp = n_c*A_b",
    title="Area of the compression bars",
    clause="G30.18",
    basis=MECHANICS,
)
COMPRESSION_DEPTH = _formula(
    "d_p = c_c + d_bs + d_b/2",
    title="Depth to the compression bars",
    clause="geometry",
    basis=MECHANICS,
)
DEPTH_ONE_LAYER = _formula(
    "d = h - c_c - d_bs - d_b/2", title="Effective depth", clause="geometry", basis=MECHANICS
)
AREA_OF_BARS = _formula("A_s = n_b*A_b", title="Area of the bars", clause="G30.18", basis=MECHANICS)
TOTAL_AREA = _formula(
    "A_s = A_s1 + A_s2", title="Area of the bars", clause="G30.18", basis=MECHANICS
)
STANDING_AREA = _formula(
    "A_sall = A_s1 + A_s2",
    title="Area of the bars that stand here, developed or not",
    clause="G30.18",
    basis=MECHANICS,
)

FORMULAS = (
    LEAST_CLEAR,
    CLEAR,
    DEPTH_FIRST,
    LAYER_DISTANCE,
    DEPTH_SECOND,
    DEPTH_TWO_LAYERS,
    DEPTH_ONE_LAYER,
    AREA_OF_BARS,
    TOTAL_AREA,
    STANDING_AREA,
    TOP_AREA_T,
    TOP_AREA_L,
    TOP_AREA_RECTANGULAR,
    COMPRESSION_AREA,
    COMPRESSION_DEPTH,
)
CRITERIA = (FITS, FITS_SECOND, FITS_OVERHANG)
TABLES = (BARS, STIRRUP_BENDS, GRADES)
