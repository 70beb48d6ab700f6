"""Other valid ways: simplified or general shear, table or equation, coefficients, handbook tables.

Beams of the flow; what each way gives is worked by hand from the values beside it.
"""

from __future__ import annotations

import math
from functools import cache

import pytest
from tests.audit.hand import beam, judged, sheet_of
from tests.beams.continuous import flow

from lineproof.audit.data import Verdict
from lineproof.record import Record


@cache
def spans(**changes: str) -> Record:
    """Return the record of three spans."""
    return flow.record_of(**changes)


def value(record: Record, entry_id: str) -> float:
    """Return a recorded value in its printed unit."""
    return float(record.entries[entry_id]["value"])


def said_of(record: Record, entry_id: str, text: str) -> tuple[Verdict, str]:
    made = judged(record, {entry_id: text})[entry_id]
    return made.verdict, made.note


# -- shear -------------------------------------------------------------------------------------


def simplified(record: Record, part: str) -> float:
    """V_r by hand: 0.65 x 0.18 x sqrt(f'c) b_w d_v + 0.85 A_v f_y d_v cot 35 / s [kN]."""
    d_v, s = value(record, f"{part}/d_v"), value(record, f"{part}/s")
    concrete = 0.65 * 0.18 * math.sqrt(32) * 380 * d_v
    steel = 0.85 * 200 * 400 * d_v / math.tan(math.radians(35)) / s
    return (concrete + steel) / 1000


def test_the_simplified_method_beside_the_general_one() -> None:
    record = spans()
    part = "shear-1-left"
    verdict, note = said_of(record, f"{part}/V_r", f"{simplified(record, part):.1f} kN")
    assert verdict is Verdict.OTHER_METHOD
    assert "simplified method of 11.3.6.3" in note
    assert said_of(record, f"{part}/beta", "0.18")[0] is Verdict.OTHER_METHOD
    assert said_of(record, f"{part}/theta", "35 deg")[0] is Verdict.OTHER_METHOD


def test_a_factor_of_one_method_with_that_of_the_other_is_a_slip() -> None:
    """theta of 11.3.6.3 goes with its beta 0.18, not with 0.40/(1 + 1500 eps_x)."""
    record, part = spans(), "shear-1-left"
    beta, theta = value(record, f"{part}/beta"), value(record, f"{part}/theta")
    assert beta == pytest.approx(0.40 / (1 + 1500 * value(record, f"{part}/eps_x")))
    mixed = judged(record, {f"{part}/beta": f"{beta:.3f}", f"{part}/theta": "35 deg"})
    assert mixed[f"{part}/beta"].verdict is Verdict.AGREES
    assert mixed[f"{part}/theta"].verdict is Verdict.ORIGIN
    turned = judged(record, {f"{part}/beta": "0.18", f"{part}/theta": f"{theta:.1f} deg"})
    assert turned[f"{part}/beta"].verdict is Verdict.ORIGIN
    both = judged(record, {f"{part}/beta": "0.18", f"{part}/theta": "35 deg"})
    assert {each.verdict for each in both.values()} == {Verdict.OTHER_METHOD}


def test_a_slip_in_shear_is_no_other_method() -> None:
    """One leg in place of two halves V_s: 129 + 71 by the simplified method, 143 + 74 by ours."""
    record = spans()
    concrete, steel = value(record, "shear-1-left/V_c"), value(record, "shear-1-left/V_s")
    text = f"{concrete + steel / 2:.0f} kN"
    assert said_of(record, "shear-1-left/V_r", text)[0] is Verdict.ORIGIN


def test_the_general_method_beside_the_simplified_one() -> None:
    record = spans(shear_method="simplified")
    part = "shear-1-left"
    eps_x = value(record, f"{part}/eps_xg")
    beta = 0.40 / (1 + 1500 * eps_x)
    verdict, note = said_of(record, f"{part}/beta", f"{beta:.4f}")
    assert verdict is Verdict.OTHER_METHOD
    assert "general method of 11.3.6.4" in note


def test_the_simplified_method_where_only_the_general_one_is_recorded() -> None:
    """phi_c beta sqrt(f'c) b d_v = 0.65 x 0.18 x 5.477 x 400 x 485.06 = 124.3 kN by beta 0.18."""
    givens = {"f_c": "30 MPa", "b": "400 mm", "d": "538.95 mm", "phi_c": "0.65", "eps_x": "0.0011",
              "f_root": "5.4772 MPa"}  # fmt: skip
    lines = {
        "d_v = 0.9*d": "mm", "beta = 0.40/(1 + 1500*eps_x)": "",
        "V_c = phi_c*beta*f_root*b*d_v": "kN",
    }  # fmt: skip
    record = sheet_of(lines, givens).close()
    by_hand = 0.65 * 0.18 * 5.4772 * 400 * 0.9 * 538.95 / 1000
    assert by_hand == pytest.approx(124.35, abs=0.05)
    assert said_of(record, "beam/V_c", "124 kN")[0] is Verdict.OTHER_METHOD
    assert said_of(record, "beam/V_c", "138 kN")[0] is Verdict.ORIGIN  # beta 0.20 is neither


def test_the_simplified_method_is_none_beyond_400_mpa() -> None:
    """11.3.6.3 holds for f_y up to 400 MPa: beside bars of grade 500 beta 0.18 is no other way."""
    record, part = spans(grade="500R"), "shear-1-left"
    assert said_of(record, f"{part}/beta", "0.18")[0] is Verdict.ORIGIN
    assert said_of(record, f"{part}/theta", "35 deg")[0] is Verdict.ORIGIN
    concrete = 0.65 * 0.18 * math.sqrt(32) * 380 * value(record, f"{part}/d_v") / 1000
    assert said_of(record, f"{part}/V_c", f"{concrete:.1f} kN")[0] is Verdict.ORIGIN


# -- development, modulus, inertia -------------------------------------------------------------


def test_table_or_general_expression_of_development() -> None:
    """20M, k_4 0.8: 1.15 x 0.8 x 400 x 300/(min(d_cs + K_tr, 2.5 x 19.5) sqrt(32)) by 12.2.2."""
    record = spans()
    part = "anchorage-bar-1"
    splitting = min(value(record, f"{part}/d_cs") + value(record, f"{part}/K_tr"), 2.5 * 19.5)
    length = 1.15 * 0.8 * 400 * 300 / (splitting * math.sqrt(32))
    verdict, note = said_of(record, f"{part}/l_d", f"{length:.0f} mm")
    assert verdict is Verdict.OTHER_METHOD
    assert "general expression of 12.2.2" in note
    assert said_of(record, f"{part}/l_s", f"{1.3 * length:.0f} mm")[0] is Verdict.OTHER_METHOD
    assert said_of(record, f"{part}/l_d", f"{0.8 * length:.0f} mm")[0] is Verdict.ORIGIN


def test_the_general_modulus_of_elasticity() -> None:
    """(3300 sqrt(32) + 6900)(2400/2300)^1.5 = 27 259 MPa, against 4500 sqrt(32) = 25 456."""
    by_hand = (3300 * math.sqrt(32) + 6900) * (2400 / 2300) ** 1.5
    assert by_hand == pytest.approx(27_253, abs=10)
    verdict, note = said_of(spans(), "materials/E_c", f"{by_hand:.0f} MPa")
    assert verdict is Verdict.OTHER_METHOD
    assert "8.6.2.2" in note
    ratio = said_of(spans(), "deflection-1-sections/n_E", f"{200_000 / by_hand:.2f}")
    assert ratio[0] is Verdict.OTHER_METHOD


def test_the_short_modulus_is_that_of_normal_density_only() -> None:
    """8.6.2.3 is of normal density: 4500 sqrt(35) = 26 622 is none of semi-low."""
    record = spans(density="semi-low", f_c="35 MPa")
    assert value(record, "materials/lambda_") == 0.85
    text = f"{4500 * math.sqrt(35):.0f} MPa"
    assert said_of(record, "materials/E_c", text)[0] is Verdict.ORIGIN


def test_the_moment_of_inertia_at_midspan_alone() -> None:
    record = spans()
    middle = value(record, "deflection-1-all/I_em")
    text = f"{middle / 1e9:.3f}e9 mm4"
    assert said_of(record, "deflection-1-all/I_ea", text)[0] is Verdict.OTHER_METHOD
    shorter = value(record, "deflection-1-all/delta_DL") * (
        value(record, "deflection-1-all/I_ea") / middle
    )
    assert said_of(record, "deflection-1-all/delta_DL", f"{shorter:.3f} mm")[0] is (
        Verdict.OTHER_METHOD
    )


def test_the_allowance_for_the_stress_of_the_bars() -> None:
    """500R under 60 mm: the stress is calculated, 0.6 x 500 = 300 MPa may be taken (10.6.1)."""
    record = spans(exposure="C-1", cover="60 mm", f_c="35 MPa", grade="500R", b_w="450 mm")
    assert "sag-1/stress-allowance" in record.entries
    verdict, note = said_of(record, "sag-1/f_s", "300 MPa")
    assert verdict is Verdict.OTHER_METHOD
    assert "0.6 f_y" in note
    z = 300 * (value(record, "sag-1/d_c") * value(record, "sag-1/A_e")) ** (1 / 3)
    assert said_of(record, "sag-1/z", f"{z:.0f} N/mm")[0] is Verdict.OTHER_METHOD
    assert said_of(record, "sag-1/f_s", "250 MPa")[0] is Verdict.ORIGIN  # 0.5 f_y is none


# -- tables of a handbook ----------------------------------------------------------------------


def test_a_resistance_by_a_table_of_k() -> None:
    """K_r = 206.636e6/(400 x 538.95^2) = 1.7785, read 1.8: 1.8 x 116.187e6 = 209.1 kN.m."""
    verdict, note = said_of(beam(), "strength/M_r", "209 kN.m")
    assert verdict is Verdict.OTHER_METHOD
    assert "1.8" in note
    assert said_of(beam(), "strength/M_r", "212 kN.m")[0] is Verdict.ORIGIN


def test_steel_by_a_ratio_of_a_table() -> None:
    """M_f 415, b 400, d 546, f'c 40: block 0.79 x 0.65 x 40 x 400 = 8216 N/mm.

    a = 546 - sqrt(546^2 - 2 x 415e6/8216) = 102.05; A_s = 8216 x 102.05/340 = 2466; rho 0.01129,
    read 0.0113: 0.0113 x 400 x 546 = 2468 mm2.
    """
    givens = {"M_f": "415 kN.m", "b": "400 mm", "d": "546 mm", "f_c": "40 MPa", "f_y": "400 MPa",
              "phi_c": "0.65", "phi_s": "0.85", "alpha_1": "0.79"}  # fmt: skip
    lines = {
        "a_r = d - sqrt(d**2 - 2*M_f/(alpha_1*phi_c*f_c*b))": "mm",
        "A_sr = alpha_1*phi_c*f_c*b*a_r/(phi_s*f_y)": "mm2",
    }
    record = sheet_of(lines, givens).close()
    verdict, note = said_of(record, "beam/A_sr", "2468 mm2")
    assert verdict is Verdict.OTHER_METHOD
    assert "0.0113" in note
    assert said_of(record, "beam/A_sr", "2433 mm2")[0] is Verdict.ORIGIN


# -- coefficients ------------------------------------------------------------------------------


@pytest.fixture(scope="module")
def alike() -> Record:
    """Three spans of 8 m, to which 9.3.3 applies: clear 8 - 0.45 or 8 - 0.425."""
    return spans(spans=("8 m", "8 m", "8 m"), superimposed="3 kPa")


@pytest.mark.parametrize(
    ("part", "divisor", "clear"),
    [
        ("sag-1", 14, (7.575,)),
        ("sag-1", 11, (7.575,)),
        ("sag-2", 16, (7.55,)),
        ("hog-2-left", 10, (7.575, 7.55)),
        ("hog-2-right", 11, (7.575, 7.55)),
    ],
)
def test_moments_by_coefficients(
    alike: Record, part: str, divisor: int, clear: tuple[float, ...]
) -> None:
    """w_f l_n^2 over the divisor of Table 9.1, l_n the mean of the spans beside a support."""
    load = 1.25 * value(alike, "loads/w_D2") + 1.5 * value(alike, "loads/w_L2")
    moment = load * (sum(clear) / len(clear)) ** 2 / divisor
    verdict, note = said_of(alike, f"{part}/M_f", f"{moment:.1f} kN.m")
    assert verdict is Verdict.OTHER_METHOD
    assert f"1/{divisor} of 9.3.3" in note


def test_no_coefficient_where_they_do_not_apply() -> None:
    """7.6, 9.2, 7.6 m: 8.75/7.175 = 1.22 is more than 1.2, so w_f l_n^2/16 is no way to it."""
    record = spans()
    load = 1.25 * value(record, "loads/w_D2") + 1.5 * value(record, "loads/w_L2")
    text = f"{load * 8.75**2 / 16:.1f} kN.m"
    assert said_of(record, "sag-2/M_f", text)[0] is Verdict.ORIGIN


def test_the_coefficient_of_an_end_is_that_of_what_it_is_cast_with() -> None:
    """Table 9.1: w_f l_n^2/16 at a column, w_f l_n^2/24 at a spandrel; on a wall 1/11 in the span.

    Between columns of 400 and 450 mm l_n is 8 - 0.425 = 7.575 m.
    """
    spans_of = ("8 m", "8 m", "8 m")
    supports = ("column 400 mm", "column 450 mm", "column 450 mm", "wall 400 mm")
    record = spans(spans=spans_of, supports=supports, superimposed="3 kPa")
    load = 1.25 * value(record, "loads/w_D1") + 1.5 * value(record, "loads/w_L1")

    def said(entry_id: str, divisor: int) -> Verdict:
        return said_of(record, entry_id, f"{load * 7.575**2 / divisor:.1f} kN.m")[0]

    assert said("hog-1-right/M_f", 24) is Verdict.ORIGIN
    assert said("sag-3/M_f", 11) is Verdict.OTHER_METHOD
    assert said("sag-3/M_f", 14) is Verdict.ORIGIN
    assert said("sag-1/M_f", 14) is Verdict.OTHER_METHOD


def test_no_coefficients_where_the_calc_says_that_they_do_not_apply() -> None:
    """Moments redistributed by 10 %: 9.2.4 goes out from an analysis, not from coefficients."""
    record = flow.record_of(
        spans=["8 m", "8 m", "8 m"], superimposed="3 kPa", redistribution={2: 10, 3: 10}
    )
    assert "coefficients/not-applicable" in record.entries
    load = 1.25 * value(record, "loads/w_D2") + 1.5 * value(record, "loads/w_L2")
    text = f"{load * 7.55**2 / 16:.1f} kN.m"
    assert said_of(record, "sag-2/M_f", text)[0] is not Verdict.OTHER_METHOD


def test_a_simple_span_moment_is_never_one(alike: Record) -> None:
    load = 1.25 * value(alike, "loads/w_D2") + 1.5 * value(alike, "loads/w_L2")
    assert said_of(alike, "sag-2/M_f", f"{load * 8**2 / 8:.1f} kN.m")[0] is Verdict.ORIGIN
