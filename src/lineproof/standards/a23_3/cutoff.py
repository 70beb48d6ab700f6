"""Clauses 12.10 to 12.12: where bars may be cut, bars into supports, top bars past inflection."""

from __future__ import annotations

from functools import partial

from lineproof.formula import COMMON_PRACTICE, FROM_MEMORY, criterion, formula
from lineproof.standards.a23_3.notation import NOTATION as A23_3
from lineproof.standards.nbc.notation import NOTATION as NBC
from lineproof.standards.references import MECHANICS

_formula = partial(formula, notation=A23_3 | NBC)
_criterion = partial(criterion, notation=A23_3 | NBC)

EXTENSION = _formula(
    "l_e = max(d, 12*d_b, d_v*cot(theta))",
    unit="mm",
    clause="12.10.3",
    title="Extension past the point of no further need, shear shift counted",
    basis=FROM_MEMORY,
)
EXTENSION_PLAIN = _formula(
    "l_e = max(d, 12*d_b)",
    clause="12.10.3",
    title="Extension past the point of no further need",
    basis=FROM_MEMORY,
)
CONTINUING = _formula(
    "l_co = l_d + max(d, 12*d_b)",
    clause="12.10.4",
    title="Length of continuing bars past that point",
    basis=FROM_MEMORY,
)
TENSION_OTHER_SIDE = _formula(
    "F_lt = (V_f - 0.5*min(V_s, V_f))*cot(theta) - M_f/d_v",
    clause="11.3.9.3",
    title="Force in the bars, the moment pressing their side",
    basis=FROM_MEMORY,
)
PAST_INWARD = _formula(
    "l_ext = x_t - x_e",
    clause="geometry",
    title="Extension of the bars towards the support",
    basis=MECHANICS,
)
PAST_OUTWARD = _formula(
    "l_ext = x_e - x_t",
    clause="geometry",
    title="Extension of the bars away from the support",
    basis=MECHANICS,
)
PAST_SUPPORT = _formula(
    "l_ext = x_e + x_t",
    clause="geometry",
    title="Extension of the bars, past the support from the span behind it",
    basis=MECHANICS,
)
CONTINUING_INWARD = _formula(
    "l_cn = x_t - x_co",
    clause="geometry",
    title="Length of the continuing bars towards the support",
    basis=MECHANICS,
)
CONTINUING_OUTWARD = _formula(
    "l_cn = x_co - x_t",
    clause="geometry",
    title="Length of the continuing bars away from the support",
    basis=MECHANICS,
)
CONTINUING_PAST_SUPPORT = _formula(
    "l_cn = x_co + x_t",
    clause="geometry",
    title="Length of the continuing bars, past the support from the span behind it",
    basis=MECHANICS,
)
EXTENDED = _criterion(
    "l_e <= l_ext",
    clause="12.10.3",
    title="Extension past the point of no further need",
    basis=FROM_MEMORY,
    yes="The bars extend far enough past the point of no further need.",
    no="The bars do NOT extend far enough past the point of no further need.",
    key="cut-extension",
)
CONTINUES = _criterion(
    "l_co <= l_cn",
    clause="12.10.4",
    title="Length of the continuing bars past that point",
    basis=FROM_MEMORY,
    yes="The continuing bars reach far enough.",
    no="The continuing bars do NOT reach far enough.",
    key="cut-continuing",
)
SUFFICES = _criterion(
    "M_f <= M_r",
    clause="12.10.3",
    title="Moment that the continuing bars carry alone",
    basis=MECHANICS,
    yes="From here on the continuing bars carry the moment alone.",
    no="The continuing bars do NOT carry the moment alone here.",
    key="cut-point",
)
IN_SUPPORT = _formula(
    "l_in = b_sp/2 - x_e",
    clause="geometry",
    title="Length of the bottom bars inside the support",
    basis=MECHANICS,
)
PAST_CENTRE = _formula(
    "l_a = b_sp/2 - c_end",
    clause="12.11.3",
    title="Embedment past the centre of the support",
    basis=FROM_MEMORY,
)
CUT_AT_LOW_SHEAR = _criterion(
    "V_f <= 2/3*V_r",
    clause="12.10.5",
    title="Cut in the tension zone: low shear",
    basis=FROM_MEMORY,
    yes="The shear is low enough to cut bars here.",
    no="The shear is NOT low enough to cut bars here.",
    key="cut-low-shear",
)
CUT_AT_DOUBLE_AREA = _criterion(
    "2*A_sr <= A_co",
    unit="mm2",
    clause="12.10.5",
    title="Cut in the tension zone: continuing bars twice the requirement",
    basis=FROM_MEMORY,
    yes="The continuing bars are twice what the moment requires.",
    no="The continuing bars are NOT twice what the moment requires.",
    key="cut-double-area",
)
CUT_AT_MODERATE_SHEAR = _criterion(
    "V_f <= 0.75*V_r",
    clause="12.10.5",
    title="Cut in the tension zone: moderate shear with double area",
    basis=FROM_MEMORY,
    yes="The shear is low enough to cut bars here, the others being doubled.",
    no="The shear is NOT low enough to cut bars here.",
    key="cut-moderate-shear",
)
CUT_OF_THIN_BARS = _criterion(
    "d_b <= 35.7",
    clause="12.10.5",
    title="Cut in the tension zone: double area only for bars up to 35M",
    basis=FROM_MEMORY,
    numbers={"35.7": "mm"},
    yes="The bars may end here where those that go on are doubled.",
    no="Thicker than 35M: the bars may end here at low shear only, however many go on.",
    key="cut-thin-bars",
)

INTO_SIMPLE_SUPPORT = _criterion(
    "A_s/3 <= A_se",
    unit="mm2",
    clause="12.11.1",
    title="Bottom bars into a simple support: a third",
    basis=FROM_MEMORY,
    yes="Enough of the bottom bars enter the support.",
    no="NOT enough of the bottom bars enter the support.",
    key="bars-into-support",
)
INTO_CONTINUOUS_SUPPORT = _criterion(
    "A_s/4 <= A_se",
    unit="mm2",
    clause="12.11.1",
    title="Bottom bars into a continuous support: a quarter",
    basis=FROM_MEMORY,
    yes="Enough of the bottom bars enter the support.",
    no="NOT enough of the bottom bars enter the support.",
    key="bars-into-support",
)
LENGTH_IN_SUPPORT = _criterion(
    "150 <= l_in",
    clause="12.11.1",
    title="Length of the bottom bars inside the support",
    basis=FROM_MEMORY,
    numbers={"150": "mm"},
    yes="The bottom bars reach 150 mm into the support.",
    no="The bottom bars do NOT reach 150 mm into the support.",
    key="length-in-support",
)
ANCHORED_LATERAL = _criterion(
    "l_d <= l_in",
    clause="12.11.2",
    title="Bottom bars of a member that resists lateral loads",
    basis=FROM_MEMORY,
    yes="The bottom bars develop their yield strength at the face of the support.",
    no="The bottom bars do NOT develop their yield strength at the face of the support.",
    key="anchored-lateral",
)
PAST_INFLECTION = _formula(
    "l_a = min(l_ext, max(d, 12*d_b))",
    clause="12.11.3",
    title="Embedment past the point of inflection",
    basis=FROM_MEMORY,
)
LIMIT = _formula(
    "l_lim = M_r/V_f + l_a",
    clause="12.11.3",
    title="Largest development length of the bars that go on there",
    basis=FROM_MEMORY,
)
LIMIT_CONFINED = _formula(
    "l_lim = 1.3*M_r/V_f + l_a",
    clause="12.11.3",
    title="Largest development length, ends confined by a compressive reaction",
    basis=FROM_MEMORY,
)
DEVELOPED_AT_ZERO_MOMENT = _criterion(
    "l_d <= l_lim",
    clause="12.11.3",
    title="Development of the bottom bars where the moment is zero",
    basis=FROM_MEMORY,
    yes="The bottom bars develop as fast as the moment grows.",
    no="The bottom bars do NOT develop as fast as the moment grows: thinner bars.",
    key="development-zero-moment",
)

TOP_PAST_INFLECTION = _criterion(
    "A_s/3 <= A_pi",
    unit="mm2",
    clause="12.12.2",
    title="Top bars past the point of inflection: a third",
    basis=FROM_MEMORY,
    yes="Enough of the top bars pass the point of inflection.",
    no="NOT enough of the top bars pass the point of inflection.",
    key="top-past-inflection",
)
LENGTH_PAST_INFLECTION = _formula(
    "l_pi = max(d, 12*d_b, l_n/16)",
    unit="mm",
    clause="12.12.2",
    title="Least extension of the top bars past the point of inflection",
    basis=FROM_MEMORY,
)
LONG_PAST_INFLECTION = _criterion(
    "l_pi <= l_ext",
    clause="12.12.2",
    title="Extension of the top bars past the point of inflection",
    basis=FROM_MEMORY,
    yes="The top bars reach far enough past the point of inflection.",
    no="The top bars do NOT reach far enough past the point of inflection.",
    key="length-past-inflection",
)

RESTRAINED_END = _criterion(
    "l_n/4 <= l_ext",
    clause="12.12.1",
    title="Top bars at an end with an assumed restraint: a quarter of the clear span",
    basis=COMMON_PRACTICE,
    yes="The top bars reach far enough past the face of the support.",
    no="The top bars do NOT reach far enough past the face of the support.",
    key="restrained-end",
)
PAST_FACE = _formula(
    "l_ext = x_e - b_sp/2",
    clause="geometry",
    title="Extension of the bars past the face of the support",
    basis=MECHANICS,
)

FORMULAS = (
    TENSION_OTHER_SIDE, EXTENSION, EXTENSION_PLAIN, CONTINUING, PAST_INWARD,
    PAST_OUTWARD, PAST_SUPPORT, CONTINUING_INWARD, CONTINUING_OUTWARD, CONTINUING_PAST_SUPPORT,
    IN_SUPPORT, PAST_CENTRE, PAST_INFLECTION, PAST_FACE, LIMIT, LIMIT_CONFINED,
    LENGTH_PAST_INFLECTION,
)  # fmt: skip
CRITERIA = (
    EXTENDED, CONTINUES, SUFFICES, CUT_AT_LOW_SHEAR, CUT_AT_DOUBLE_AREA, CUT_AT_MODERATE_SHEAR,
    CUT_OF_THIN_BARS,
    INTO_SIMPLE_SUPPORT, INTO_CONTINUOUS_SUPPORT, LENGTH_IN_SUPPORT, ANCHORED_LATERAL,
    DEVELOPED_AT_ZERO_MOMENT, TOP_PAST_INFLECTION, LONG_PAST_INFLECTION, RESTRAINED_END,
)  # fmt: skip
