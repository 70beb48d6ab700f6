"""Clause 10.5: minimum reinforcement, and flanges in tension."""

from __future__ import annotations

from functools import partial

from lineproof.formula import FROM_MEMORY, criterion, formula
from lineproof.standards.a23_3.notation import NOTATION

_formula = partial(formula, notation=NOTATION)
_criterion = partial(criterion, notation=NOTATION)

BY_CRACKING = _criterion(
    "1.2*M_cr <= M_r",
    unit="kN.m",
    clause="10.5.1.1",
    title="Minimum reinforcement by the cracking moment",
    basis=FROM_MEMORY,
    yes="The resistance exceeds the cracking moment by the margin required.",
    no="The resistance does NOT exceed the cracking moment by the margin required.",
    key="minimum-by-cracking",
)
BY_CRACKING_TOP = _criterion(
    "1.2*M_crn <= M_r",
    unit="kN.m",
    clause="10.5.1.1",
    title="Minimum top reinforcement by the cracking moment",
    basis=FROM_MEMORY,
    yes="The resistance exceeds the cracking moment by the margin required.",
    no="The resistance does NOT exceed the cracking moment by the margin required.",
    key="minimum-by-cracking",
)
WIDTH_WEB = _formula(
    "b_t = b_w",
    clause="10.5.1.2",
    title="Width of the tension zone: the web",
    basis=FROM_MEMORY,
)
WIDTH_FLANGE_T = _formula(
    "b_t = min(b_f, 2.5*b_w)",
    clause="10.5.1.2",
    title="Width of the tension zone: flange on both sides",
    basis=FROM_MEMORY,
)
WIDTH_FLANGE_L = _formula(
    "b_t = min(b_f, 1.5*b_w)",
    clause="10.5.1.2",
    title="Width of the tension zone: flange on one side",
    basis=FROM_MEMORY,
)
A_S_MIN = _formula(
    "A_smin = 0.2*sqrt(f_c)*b_t*h/f_y",
    clause="10.5.1.2",
    title="Minimum reinforcement of beams",
    basis=FROM_MEMORY,
    numbers={"0.2": "MPa^0.5"},
)
BY_AREA = _criterion(
    "A_smin <= A_s",
    clause="10.5.1.2",
    title="Minimum reinforcement",
    basis=FROM_MEMORY,
    yes="The reinforcement provided exceeds the minimum.",
    no="The reinforcement provided is BELOW the minimum.",
    key="minimum-steel",
)
WAIVER = _criterion(
    "4/3*M_f <= M_r",
    unit="kN.m",
    clause="10.5.1.3",
    title="Waiver of the minimum: resistance a third above the moment",
    basis=FROM_MEMORY,
    yes="The resistance is a third above the moment: the minimum need not be met.",
    no="The resistance is NOT a third above the moment: the minimum must be met.",
    key="waiver",
)
SPREAD_WIDTH = _formula(
    "b_ot = min(b_o, l/20)",
    clause="10.5.3.1",
    title="Overhang in which part of the top bars is spread",
    basis=FROM_MEMORY,
)
SPREAD_AREA = _formula(
    "A_so = 0.004*b_ot*h_f",
    clause="10.5.3.1",
    title="Least area of top bars in one overhang",
    basis=FROM_MEMORY,
)
SPREAD = _criterion(
    "A_so <= n_o*A_b",
    unit="mm2",
    clause="10.5.3.1",
    title="Top bars spread over the overhang",
    basis=FROM_MEMORY,
    yes="The overhang holds the top bars it needs.",
    no="The overhang does NOT hold the top bars it needs.",
    key="top-bars-spread",
)

FORMULAS = (WIDTH_WEB, WIDTH_FLANGE_T, WIDTH_FLANGE_L, A_S_MIN, SPREAD_WIDTH, SPREAD_AREA)
CRITERIA = (BY_CRACKING, BY_CRACKING_TOP, BY_AREA, WAIVER, SPREAD)
