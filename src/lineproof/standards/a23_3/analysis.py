"""Clauses 9.2.4 and 9.3.3: redistribution of support moments, approximate coefficients."""

from __future__ import annotations

from functools import partial

from lineproof.formula import FROM_MEMORY, criterion, formula
from lineproof.sheet import LookupTable
from lineproof.standards.a23_3.notation import NOTATION as A23_3
from lineproof.standards.nbc.notation import NOTATION as NBC
from lineproof.standards.references import MECHANICS

_formula = partial(formula, notation=A23_3 | NBC)
_criterion = partial(criterion, notation=A23_3 | NBC)

MOMENT_DIVISORS = LookupTable(
    "Approximate moments of continuous beams: divisors",
    "section of the approximate moments",
    {"k_M": ""},
    {
        "positive, end span, unrestrained end": {"k_M": "11"},
        "positive, end span, end built in": {"k_M": "14"},
        "positive, interior span": {"k_M": "16"},
        "negative, first interior support, two spans": {"k_M": "9"},
        "negative, first interior support, three spans or more": {"k_M": "10"},
        "negative, other interior supports": {"k_M": "11"},
        "negative, short spans or stiff columns": {"k_M": "12"},
        "negative, exterior support on a spandrel": {"k_M": "24"},
        "negative, exterior support on a column": {"k_M": "16"},
    },
    "A23.3, Table 9.1",
    clause="9.3.3",
    basis=FROM_MEMORY,
)
SHEAR_FACTORS = LookupTable(
    "Approximate shears of continuous beams: factors",
    "face of the approximate shears",
    {"k_V": ""},
    {
        "end span, first interior support": {"k_V": "1.15"},
        "other supports": {"k_V": "1.0"},
    },
    "A23.3, Table 9.1",
    clause="9.3.3",
    basis=FROM_MEMORY,
)

CLEAR_SPAN = _formula(
    "l_n = l - (b_sl + b_sr)/2",
    clause="9.2.2",
    title="Clear span",
    basis=MECHANICS,
    system="kN-m",
)
CLEAR_FROM_LEFT = _formula(
    "l_n = l - b_sl/2",
    clause="9.2.2",
    title="Clear length of the cantilever",
    basis=MECHANICS,
    system="kN-m",
)
CLEAR_FROM_RIGHT = _formula(
    "l_n = l - b_sr/2",
    clause="9.2.2",
    title="Clear length of the cantilever",
    basis=MECHANICS,
    system="kN-m",
)
TO_FACE = _formula(
    "x_f = b_sn/2",
    clause="9.2.2",
    title="From the support axis to the face",
    basis=MECHANICS,
    system="kN-m",
)
FROM_FACE = _formula(
    "x_f = b_sn/2 + d_v",
    clause="11.3.2",
    title="From the support axis to the section at d_v from the face",
    basis=MECHANICS,
    system="kN-m",
)

LARGEST_CHANGE = _formula(
    "p_max = max(min(30 - 50*c/d, 20), 0)",
    clause="9.2.4",
    title="Largest redistribution of a support moment, per cent",
    basis=FROM_MEMORY,
)
CHANGE_ALLOWED = _criterion(
    "abs(p_rd) <= p_max",
    clause="9.2.4",
    title="Redistribution of the support moment",
    basis=FROM_MEMORY,
    yes="The support moment is changed by no more than the section allows.",
    no="The support moment is changed by MORE than the section allows.",
    key="redistribution",
)
REDISTRIBUTED = _formula(
    "M_f = M_fe*(1 - p_rd/100)",
    clause="9.2.4",
    title="Support moment after redistribution, same load case",
    basis=MECHANICS,
)

MEAN_SPAN = _formula(
    "l_na = (l_n1 + l_n2)/2",
    clause="9.3.3",
    title="Clear span for negative moments: mean of the adjacent ones",
    basis=FROM_MEMORY,
    system="kN-m",
)
POSITIVE = _formula(
    "M_f = w_f*l_n**2/k_M",
    clause="9.3.3",
    title="Positive moment by the approximate coefficients",
    basis=FROM_MEMORY,
    system="kN-m",
)
NEGATIVE = _formula(
    "M_f = w_f*l_na**2/k_M",
    clause="9.3.3",
    title="Negative moment by the approximate coefficients",
    basis=FROM_MEMORY,
    system="kN-m",
)
SHEAR = _formula(
    "V_f = k_V*w_f*l_n/2",
    clause="9.3.3",
    title="Shear at the face by the approximate coefficients",
    basis=FROM_MEMORY,
    system="kN-m",
)
LIKE_SPANS = _criterion(
    "l_n1 <= 1.2*l_n2",
    clause="9.3.3",
    title="Approximate coefficients: adjacent spans",
    basis=FROM_MEMORY,
    system="kN-m",
    yes="The adjacent spans are alike: the coefficients apply.",
    no="The adjacent spans differ too much: the coefficients do NOT apply.",
    key="like-spans",
)
LIKE_LOADS = _criterion(
    "w_Lf <= 2*w_Df",
    clause="9.3.3",
    title="Approximate coefficients: live against dead load",
    basis=FROM_MEMORY,
    system="kN-m",
    yes="The live load is at most twice the dead load: the coefficients apply.",
    no="The live load is more than twice the dead load: the coefficients do NOT apply.",
    key="like-loads",
)

FORMULAS = (
    CLEAR_SPAN, CLEAR_FROM_LEFT, CLEAR_FROM_RIGHT, TO_FACE, FROM_FACE, LARGEST_CHANGE,
    REDISTRIBUTED, MEAN_SPAN, POSITIVE, NEGATIVE, SHEAR,
)  # fmt: skip
CRITERIA = (CHANGE_ALLOWED, LIKE_SPANS, LIKE_LOADS)
TABLES = (MOMENT_DIVISORS, SHEAR_FACTORS)
