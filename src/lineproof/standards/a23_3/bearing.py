"""Clause 10.8: bearing of the beam on its support."""

from __future__ import annotations

from functools import partial

from lineproof.formula import FROM_MEMORY, criterion, formula
from lineproof.standards.a23_3.notation import NOTATION
from lineproof.standards.references import MECHANICS

_formula = partial(formula, notation=NOTATION)
_criterion = partial(criterion, notation=NOTATION)

LOADED_AREA = _formula(
    "A_1 = b_w*l_b", clause="10.8.1", title="Loaded area of the bearing", basis=MECHANICS
)
LOADED_AREA_NARROW = _formula(
    "A_1 = min(b_w, b_col)*l_b",
    unit="mm2",
    clause="10.8.1",
    title="Loaded area of the bearing, on a column narrower than the beam",
    basis=MECHANICS,
)
RESISTANCE = _formula(
    "B_r = 0.85*phi_c*f_c*A_1*min(sqrt(A_2/A_1), 2)",
    clause="10.8.1",
    title="Factored bearing resistance",
    basis=FROM_MEMORY,
)
STRENGTH = _criterion(
    "R_f <= B_r",
    clause="10.8.1",
    title="Bearing at the support",
    basis=FROM_MEMORY,
    yes="The concrete carries the reaction.",
    no="The concrete does NOT carry the reaction: a longer bearing.",
    key="bearing",
)

FORMULAS = (LOADED_AREA, LOADED_AREA_NARROW, RESISTANCE)
CRITERIA = (STRENGTH,)
