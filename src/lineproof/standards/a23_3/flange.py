"""Clause 10.3: effective width of the flange; and the gross section that follows from it."""

from __future__ import annotations

from functools import partial

from lineproof.formula import FROM_MEMORY, formula
from lineproof.standards.a23_3.notation import NOTATION
from lineproof.standards.references import MECHANICS

_formula = partial(formula, notation=NOTATION)

CLEAR_DISTANCE = _formula(
    "l_w = s_b - b_w", title="Clear distance to the next web", basis=MECHANICS, clause="10.3.3"
)
OVERHANG_T_SIMPLE = _formula(
    "b_o = min(l/5, 12*h_f, l_w/2)",
    clause="10.3.3",
    title="Effective overhang, flange on both sides, simply supported",
    basis=FROM_MEMORY,
)
OVERHANG_T_CONTINUOUS = _formula(
    "b_o = min(l/10, 12*h_f, l_w/2)",
    clause="10.3.3",
    title="Effective overhang, flange on both sides, continuous",
    basis=FROM_MEMORY,
)
OVERHANG_L = _formula(
    "b_o = min(l/12, 6*h_f, l_w/2)",
    clause="10.3.4",
    title="Effective overhang, flange on one side",
    basis=FROM_MEMORY,
)
WIDTH_T = _formula(
    "b_f = b_w + 2*b_o", clause="10.3.3", title="Effective width of the flange", basis=FROM_MEMORY
)
WIDTH_L = _formula(
    "b_f = b_w + b_o", clause="10.3.4", title="Effective width of the flange", basis=FROM_MEMORY
)

AREA_TEE = _formula(
    "A_g = b_w*h + (b_f - b_w)*h_f", title="Gross area", clause="geometry", basis=MECHANICS
)
CENTROID_TEE = _formula(
    "y_b = (b_w*h*h/2 + (b_f - b_w)*h_f*(h - h_f/2))/A_g",
    title="Centroid above the bottom",
    clause="geometry",
    basis=MECHANICS,
)
INERTIA_TEE = _formula(
    "I_g = b_w*h**3/12 + b_w*h*(y_b - h/2)**2"
    " + (b_f - b_w)*h_f**3/12 + (b_f - b_w)*h_f*(h - h_f/2 - y_b)**2",
    title="Moment of inertia about the centroid",
    clause="geometry",
    basis=MECHANICS,
)
AREA_RECTANGLE = _formula("A_g = b_w*h", title="Gross area", clause="geometry", basis=MECHANICS)
CENTROID_RECTANGLE = _formula(
    "y_b = h/2", title="Centroid above the bottom", clause="geometry", basis=MECHANICS
)
INERTIA_RECTANGLE = _formula(
    "I_g = b_w*h**3/12",
    title="Moment of inertia about the centroid",
    clause="geometry",
    basis=MECHANICS,
)
CENTROID_TOP = _formula(
    "y_t = h - y_b", title="Centroid below the top", clause="geometry", basis=MECHANICS
)
CRACKING_BOTTOM = _formula(
    "M_cr = f_r*I_g/y_b",
    clause="8.6.4",
    title="Cracking moment, positive bending",
    basis=MECHANICS,
)
CRACKING_TOP = _formula(
    "M_crn = f_r*I_g/y_t",
    clause="8.6.4",
    title="Cracking moment, negative bending",
    basis=MECHANICS,
)

FORMULAS = (
    CLEAR_DISTANCE,
    OVERHANG_T_SIMPLE,
    OVERHANG_T_CONTINUOUS,
    OVERHANG_L,
    WIDTH_T,
    WIDTH_L,
    AREA_TEE,
    CENTROID_TEE,
    INERTIA_TEE,
    AREA_RECTANGLE,
    CENTROID_RECTANGLE,
    INERTIA_RECTANGLE,
    CENTROID_TOP,
    CRACKING_BOTTOM,
    CRACKING_TOP,
)
