"""Tests to failure: twelve beams in shear, three pairs in bending; prediction against strength.

The prediction is the strength of the section with the resistance factors given, 1 for a mean
strength. A ratio of test over prediction is no match: it has neither pass nor fail.
"""

from __future__ import annotations

from lineproof.beams.validation import procedures as found
from lineproof.beams.validation.case_steps import CaseSteps, recorded
from lineproof.beams.validation.data import cases
from lineproof.sheet import Sheet
from lineproof.standards.a23_3 import (
    compression_steel,
    shear,
    shear_factors,
    strain,
    strain_closing,
    stress_block,
)

SHEAR_PREFIX = "G2-"
WITHOUT = ("OA1", "OA2", "OA3")
WITH = ("A1", "A2", "A3", "B1", "B2", "B3", "C1", "C2", "C3")
SHEAR_TESTS = tuple(f"{SHEAR_PREFIX}{beam}" for beam in WITHOUT + WITH)
"""Beams without stirrups, with stirrups, and both by the names of their cases."""
BENDING_TESTS = ("C4-1", "C4-2", "C4-3")
MODEL = "test-model"
"""The part that holds the factors of the tests."""
_MODEL_TEXT = (
    "Shear strength: the general method of 11.3.6.4. The strain at mid-depth depends on moment and"
    " shear of the same section, so the shear is found at which the shear is its own resistance: "
    "that of concrete and stirrups together, for the strain that the shear and its moment cause. "
    "The section checked lies the effective shear depth away from the load, towards the support: "
    "the shear is the same over the whole shear span and the moment grows towards the load, so the"
    " strain is largest there; nearer to the load its local compression carries the shear into the"
    " fan below it, as 11.3.2 takes it at a support. The moment of that section is the shear times"
    " the shear span less that depth. The self weight is left out. The moment resistance under the"
    " load caps the shear; it is found from strains, since the bars of some beams do not yield. "
    "The top bars of the shear tests are left out: their depth is not known here. Strengths of "
    "steel are those measured, also above 500 MPa. Nothing is tuned."
)
SERIES = {
    "h": "552 mm", "d": "457 mm", "A_30": "700 mm2", "A_25": "500 mm2", "f_30": "436 MPa",
    "f_25": "440 MPa", "a_max": "20 mm",
}  # fmt: skip
"""What the twelve beams in shear have in common."""
_FACTORS = ("phi_c", "phi_s", "lambda_", "E_s", "eps_cu")
_KEY = ("rectangle", "one layer")
_UPPER_IN_TENSION = ("rectangle", "two layers")
_DOUBLY = ("rectangle", "compression bars")


def record_model(sheet: Sheet, phi_c: str, phi_s: str) -> None:
    """Record what all predictions of tests share."""
    with sheet.part(MODEL, "How the tests are predicted"):
        sheet.note("model", _MODEL_TEXT, title="Model")
        sheet.given("phi_c", phi_c, source="1 for a mean strength")
        sheet.given("phi_s", phi_s, source="1 for a mean strength")
        sheet.given("lambda_", "1.0", source="normal-density concrete")
        sheet.given("E_s", "200000 MPa", source="8.5.4.1")
        sheet.given("eps_cu", "0.0035", source="10.1.3")
        for symbol, typed in SERIES.items():
            sheet.given(symbol, typed, source="all twelve beams in shear, from memory")


def _share(steps: CaseSteps, *symbols: str) -> None:
    """Let symbols stand for what all tests share."""
    steps.bind(**{name: steps.sheet.entry(f"{MODEL}/{name}") for name in (*_FACTORS, *symbols)})


def record_shear_tests(sheet: Sheet) -> None:
    """Record the twelve beams in shear, a part for each."""
    for name in SHEAR_TESTS:
        with recorded(sheet, cases()[name]) as steps:
            _share(steps, *SERIES)
            steps.give()
            _shear_test(steps)


def _shear_test(steps: CaseSteps) -> None:
    steps.own("A_s = n_30*A_30 + n_25*A_25", "Area of the tension bars")
    steps.own("f_y = (n_30*A_30*f_30 + n_25*A_25*f_25)/A_s", "Mean yield strength of the bars")
    _general_method(steps)
    _moment_resistance(steps)
    steps.own("V_m = M_r/l_v", "Shear at which the moment resistance is reached")
    steps.own("V_p = min(V_n, V_m)", "Predicted shear")
    steps.given("P_te", steps.case.published["P_te"].printed, source=steps.case.short)
    steps.own("V_te = P_te/2", "Largest shear of the test")
    beam = steps.case.id.removeprefix(SHEAR_PREFIX)
    steps.own(f"r_{beam} = V_te/V_p", "Test over prediction")


def _general_method(steps: CaseSteps) -> None:
    """Record the shear strength found, and the lines of the method that confirm it."""
    stirrups = "A_v" in steps.place
    f_y = steps.place["f_y"]
    steps.lines(shear.D_V, shear.V_R_MAX)
    if stirrups:
        steps.line(shear.A_V_MIN, f_y=steps.place["f_yt"])
        stirrups = bool(steps.decide(shear.HAS_MINIMUM))
    else:
        steps.lines(shear_factors.A_G, shear_factors.S_Z, shear_factors.S_ZE)
    steps.find("V_n", found.STRENGTH[stirrups], found.BELOW_CRUSHING, clause="11.3.6.4")
    steps.bind(V_f=steps.place["V_n"])
    steps.own("M_f = V_n*(l_v - d_v)", "Moment of the same load at the section checked")
    steps.line(shear_factors.EPS_X)
    steps.decide(shear_factors.STRAIN_IN_RANGE)
    if stirrups:
        steps.lines(shear_factors.BETA_STIRRUPS, shear_factors.THETA, shear.V_C)
        steps.line(shear.V_S, f_y=steps.place["f_yt"])
        steps.line(shear.V_R)
    else:
        steps.lines(shear_factors.BETA_GENERAL, shear.V_C, shear.V_R_PLAIN)
    steps.check(found.STRENGTH_CLOSES)
    steps.bind(f_y=f_y)


def _moment_resistance(steps: CaseSteps) -> None:
    """Record the moment resistance from strains: the bars may stay below yield."""
    steps.bind(b=steps.place["b_w"])
    steps.lines(stress_block.ALPHA_1, stress_block.BETA_1)
    values = {name: steps.place[name].value for name in strain.AXIS[_KEY].names or ()}
    closing, _ = strain_closing.closings(_KEY, values)
    axis = steps.find("c_l", strain.AXIS[_KEY], closing, clause="10.1.1")
    steps.bind(c=axis)
    steps.lines(compression_steel.BLOCK, compression_steel.CONCRETE_FORCE)
    steps.own("M_r = C_c*(d - a/2)", "Moment resistance")


def record_bending_tests(sheet: Sheet) -> None:
    """Record the three pairs in bending, a part for each."""
    for name in BENDING_TESTS:
        with recorded(sheet, cases()[name]) as steps:
            _share(steps)
            steps.give()
            steps.lines(stress_block.ALPHA_1, stress_block.BETA_1)
            if steps.decide(compression_steel.IN_COMPRESSION):
                _doubly(steps)
            else:
                _upper_in_tension(steps)
            for twin in ("M_t1", "M_t2"):
                steps.given(twin, steps.case.published[twin].printed, source=steps.case.short)
            steps.own("M_te = (M_t1 + M_t2)/2", "Largest moment of the test")
            steps.own(f"r_T{name[-1]} = M_te/M_r", "Test over prediction")


def _doubly(steps: CaseSteps) -> None:
    steps.find("c", strain.AXIS[_DOUBLY], compression_steel.CLOSES, clause="10.1.1")
    steps.lines(compression_steel.STRESS, compression_steel.FORCE, compression_steel.BLOCK)
    steps.lines(compression_steel.CONCRETE_FORCE, compression_steel.M_R)


def _upper_in_tension(steps: CaseSteps) -> None:
    """Record the resistance where the axis lies above the upper bars: two layers in tension."""
    place = steps.place
    steps.bind(A_s1=place["A_s"], d_1=place["d"], A_s2=place["A_sp"], d_2=place["d_p"])
    values = {name: place[name].value for name in strain.AXIS[_UPPER_IN_TENSION].names or ()}
    closing, _ = strain_closing.closings(_UPPER_IN_TENSION, values)
    steps.find("c_l", strain.AXIS[_UPPER_IN_TENSION], closing, clause="10.1.1")
    steps.own("T_2 = phi_s*A_s2*min(f_y, E_s*eps_cu*(d_2 - c_l)/c_l)", "Tension in the upper bars")
    steps.own(
        "M_r = phi_s*A_s1*f_y*(d_1 - beta_1*c_l/2) + T_2*(d_2 - beta_1*c_l/2)",
        "Moment resistance, both layers in tension",
    )
