"""Shares of the balanced reinforcement, for the capacity curve."""

from __future__ import annotations

from functools import partial

from lineproof.formula import formula
from lineproof.standards.a23_3.notation import NOTATION
from lineproof.standards.references import MECHANICS

_formula = partial(formula, notation=NOTATION, clause="10.1", basis=MECHANICS)

QUARTER = _formula("A_s = 0.25*A_sb", title="A quarter of the balanced reinforcement")
HALF = _formula("A_s = 0.5*A_sb", title="Half of the balanced reinforcement")
THREE_QUARTERS = _formula("A_s = 0.75*A_sb", title="Three quarters of the balanced reinforcement")
WHOLE = _formula("A_s = 1.0*A_sb", title="The balanced reinforcement")
RATIO = _formula("r_b = A_s/A_sb", title="Reinforcement over balanced reinforcement")

FORMULAS = (QUARTER, HALF, THREE_QUARTERS, WHOLE, RATIO)
