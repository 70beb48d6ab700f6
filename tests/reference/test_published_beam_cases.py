"""Published cases of shear, coefficients, deflection, hooks; 'from memory' where it says so.

Cases to another code use the same formula functions with that code's factors as plain inputs.
"""

from __future__ import annotations

import pytest

from lineproof.quantity import read_quantity
from lineproof.standards.a23_3 import analysis, bars, deflection, flange, hooks, shear

from .calculator import value

IN = 25.4
KIP = read_quantity("x", "1 kip", "N").value
PSI = read_quantity("x", "1 psi", "MPa").value


def test_g1_shear_with_stirrups() -> None:
    """Course example 'Shear design example ACI v1' (text opened): ACI 318M, 45 degrees, d for d_v.

    V_c = sqrt(f'c)/6 b_w d: beta = 1/6, resistance factors 1; its member factor 0.75 apart.
    """
    x: dict[str, float] = {
        "b_w": 405, "d_v": 803, "f_c": 25, "f_y": 414, "phi_c": 1, "phi_s": 1, "lambda_": 1,
        "beta": 1 / 6, "theta": 45, "s": 400, "A_v": 292.4,
    }  # fmt: skip
    x["V_c"] = value(shear.V_C, x)
    assert x["V_c"] / 1e3 == pytest.approx(271.0, abs=0.05)
    assert 0.75 * x["V_c"] / 1e3 == pytest.approx(203.3, abs=0.05)
    # printed from the rounded 203.3 and 271.0
    assert 0.5 * 0.75 * x["V_c"] / 1e3 == pytest.approx(101.7, abs=0.1)
    assert 3 * 0.75 * x["V_c"] / 1e3 == pytest.approx(609.8, abs=0.1)
    assert 5 * 0.75 * x["V_c"] / 1e3 == pytest.approx(1016.3, abs=0.1)
    # 292.4 mm2 required at 400 mm for 385.5/0.75 kN at d: the spacing comes back, and V_s
    x["V_f"] = 385.5e3 / 0.75
    assert value(shear.SPACING_REQUIRED, x) == pytest.approx(400, abs=0.2)
    assert (x["V_c"] + value(shear.V_S, x)) * 0.75 / 1e3 == pytest.approx(385.5, abs=0.1)
    # 130 mm2 by 1/3 b_w s/f_y; the minimum of A23.3 has 0.06 sqrt(25) = 0.30 in its place
    assert value(shear.A_V_MIN, x) / 0.30 / 3 == pytest.approx(130, abs=0.5)


def test_h2_hooks() -> None:
    """A23.3-04/-14/:19, 12.5.2, f'c 30: 292, 356, 460 mm, from memory.

    A formula evaluation, not a printed number: a difference of zero is no evidence.
    """
    made = {}
    for size in ("15M", "20M", "25M"):
        x: dict[str, float] = {"f_c": 30, "f_y": 400, "d_b": bars.BARS.number(size, "d_b")}
        made[size] = value(hooks.BASIC, x)
    assert made == pytest.approx({"15M": 292, "20M": 356, "25M": 460}, abs=0.5)


def test_j2_branson_inertia_and_deflection() -> None:
    """McCormac & Brown, Chapter 6, Example 6.1: from memory, cross-checked while being recalled.

    Its rounded modular ratio 9 and modulus 3.12e6 psi, modulus of rupture 7.5 sqrt(3000) psi.
    """
    x: dict[str, float] = {
        "b": 12 * IN, "b_w": 12 * IN, "h": 20 * IN, "d": 17 * IN, "A_s": 3.0 * IN**2, "n_E": 9,
        "E_c": 3.12e6 * PSI, "f_rd": 7.5 * 3000**0.5 * PSI, "l": 20 * 12 * IN,
        "w_s": 1.7 * KIP / (12 * IN),
    }  # fmt: skip
    x["I_g"] = value(flange.INERTIA_RECTANGLE, x)
    x["y_b"] = value(flange.CENTROID_RECTANGLE, x)
    assert x["I_g"] / IN**4 == pytest.approx(8000)
    x["M_crd"] = value(deflection.CRACKING_BOTTOM, x)
    assert x["M_crd"] / (KIP * 12 * IN) == pytest.approx(27.4, abs=0.05)
    x["kd"] = value(deflection.AXIS, x)
    assert x["kd"] / IN == pytest.approx(6.78, abs=0.005)
    x["I_cr"] = value(deflection.CRACKED, x)
    assert x["I_cr"] / IN**4 == pytest.approx(4067, abs=1)
    x["M_a"] = value(deflection.MOMENT_SIMPLE, x)
    assert x["M_a"] / (KIP * 12 * IN) == pytest.approx(85)
    x["I_e"] = value(deflection.EFFECTIVE, x)
    assert x["I_e"] / IN**4 == pytest.approx(4199, abs=1)
    # dead and live load together, 1.7 kip/ft
    assert value(deflection.SIMPLE_SPAN, x) / IN == pytest.approx(0.467, abs=0.0005)


def test_k12_coefficients() -> None:
    """Setareh & Darvas, 2nd ed. (2017), Table A2.1 (text opened), for ACI 318.

    That A23.3, 9.3.3 has the same set is from memory.
    """
    rows = {
        "positive, end span, unrestrained end": 0.09090909090909091,
        "positive, end span, end built in": 0.07142857142857142,
        "positive, interior span": 0.0625,
        "negative, first interior support, two spans": 0.1111111111111111,
        "negative, first interior support, three spans or more": 0.1,
        "negative, other interior supports": 0.09090909090909091,
        "negative, exterior support on a spandrel": 0.041666666666666664,
        "negative, exterior support on a column": 0.0625,
    }
    unit: dict[str, float] = {"w_f": 1, "l_n": 1, "l_na": 1}
    for row, expected in rows.items():
        unit["k_M"] = analysis.MOMENT_DIVISORS.number(row, "k_M")
        made = analysis.POSITIVE if row.startswith("positive") else analysis.NEGATIVE
        assert value(made, unit) == pytest.approx(expected, rel=1e-12), row
    factors = {
        row: analysis.SHEAR_FACTORS.number(row, "k_V") for row in analysis.SHEAR_FACTORS.rows
    }
    assert factors == {"end span, first interior support": 1.15, "other supports": 1.0}
    assert value(analysis.SHEAR, unit | {"k_V": 1.15}) == pytest.approx(1.15 / 2)
    # own check of the source: support and span together exceed w l^2/8 in every span
    assert (1 / 10 + 1 / 16) / 2 + 1 / 14 > 1 / 8
