"""Clauses 12.14 to 12.16: laps of bars in tension and compression."""

from __future__ import annotations

from functools import partial

from lineproof.formula import FROM_MEMORY, criterion, formula
from lineproof.standards.a23_3.notation import NOTATION
from lineproof.standards.references import DEVELOPMENT_GUIDE, MECHANICS

_formula = partial(formula, notation=NOTATION)
_criterion = partial(criterion, notation=NOTATION)

LAPPABLE = _criterion(
    "d_b <= 35.7",
    clause="12.14.2",
    title="Laps only of bars up to 35M",
    basis=FROM_MEMORY,
    numbers={"35.7": "mm"},
    yes="The bars may be lapped.",
    no="The bars may NOT be lapped: too thick.",
    key="lap-size",
)
EXCESS_FOR_A = _criterion(
    "2*A_sr <= A_s",
    unit="mm2",
    clause="12.15.1",
    title="Class of the lap: reinforcement against the requirement",
    basis=FROM_MEMORY,
    yes="Twice the steel required is provided: class A is possible.",
    no="Less than twice the steel required is provided: class B.",
    key="lap-excess",
)
SHARE_FOR_A = _criterion(
    "r_sp <= 0.5",
    clause="12.15.1",
    title="Class of the lap: share of the bars spliced",
    basis=FROM_MEMORY,
    yes="At most half of the bars are spliced within a lap length: class A is possible.",
    no="More than half of the bars are spliced within a lap length: class B.",
    key="lap-share",
)
CLASS_A = _formula(
    "l_s = max(1.0*l_d0, 300)",
    clause="12.15.1",
    title="Length of a tension lap, class A",
    basis=FROM_MEMORY,
    numbers={"300": "mm"},
)
CLASS_B = _formula(
    "l_s = max(1.3*l_d0, 300)",
    clause="12.15.1",
    title="Length of a tension lap, class B",
    basis=DEVELOPMENT_GUIDE,
    numbers={"300": "mm"},
)
TWO_SIZES = _formula(
    "l_s = max(l_sn, l_dk)",
    clause="12.15",
    title="Length of a lap of bars of different sizes",
    basis=FROM_MEMORY,
)
TWO_ROWS = _formula(
    "l_s = max(l_sw, l_dt*A_s1/A_s2)",
    unit="mm",
    clause="12.15",
    title="Length of a lap of two rows of bars, the stronger one stressed by the weaker one alone",
    basis=FROM_MEMORY,
)
COMPRESSION = _formula(
    "l_sc = max(0.073*f_y*d_b, 300)",
    clause="12.16.1",
    title="Length of a compression lap, bars up to 400 MPa",
    basis=FROM_MEMORY,
    numbers={"0.073": "1/MPa", "300": "mm"},
)
COMPRESSION_STRONG = _formula(
    "l_sc = max((0.133*f_y - 24)*d_b, 300)",
    clause="12.16.1",
    title="Length of a compression lap, bars above 400 MPa",
    basis=FROM_MEMORY,
    numbers={"0.133": "1/MPa", "300": "mm"},
)
CLOSE = _criterion(
    "s_nc <= min(l_s/5, 150)",
    clause="12.14.2",
    title="Distance between bars lapped without contact",
    basis=FROM_MEMORY,
    numbers={"150": "mm"},
    yes="The lapped bars are close enough.",
    no="The lapped bars are NOT close enough.",
    key="lap-distance",
)
LONG_ENOUGH = _criterion(
    "l_s <= l_lp",
    clause="12.15",
    title="Length of the lap",
    basis=FROM_MEMORY,
    yes="The lap is long enough.",
    no="The lap is NOT long enough.",
    key="lap-length",
)
CLEAR_CORNERS = _formula(
    "s_cl = s_c - d_b",
    clause="A23.1 6.6.5.2",
    title="Clear distance at the lap, corner bars lapped in contact",
    basis=MECHANICS,
)
CLEAR_PAIR = _formula(
    "s_cl = s_c - 2*d_b",
    clause="A23.1 6.6.5.2",
    title="Clear distance at the lap, both neighbours lapped in contact",
    basis=MECHANICS,
)
ROOM = _criterion(
    "s_min <= s_cl",
    clause="A23.1 6.6.5.2",
    title="Room for concrete at the lap",
    basis=FROM_MEMORY,
    yes="The bars stand far enough apart at the lap.",
    no="The bars do NOT stand far enough apart at the lap.",
    key="lap-room",
)

FORMULAS = (
    CLASS_A,
    CLASS_B,
    TWO_SIZES,
    TWO_ROWS,
    COMPRESSION,
    COMPRESSION_STRONG,
    CLEAR_CORNERS,
    CLEAR_PAIR,
)
CRITERIA = (LAPPABLE, EXCESS_FOR_A, SHARE_FOR_A, CLOSE, LONG_ENOUGH, ROOM)
