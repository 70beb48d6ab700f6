"""Published cases, each with its source; 'from memory' where no page of it was open.

Cases to another code use the same formula functions with that code's factors as plain inputs:
resistance factors 1 (its phi on the member stands apart), block 0.85 by 0.85 c.
"""

from __future__ import annotations

import math

import pytest

from lineproof.quantity import read_quantity
from lineproof.standards.a23_3 import (
    compression_steel,
    flange,
    flexure,
    materials,
    minimum,
    strain,
    stress_block,
)

from .calculator import value


def si(text: str, unit: str) -> float:
    """Return a US quantity in N, mm or MPa by the package's own list of units."""
    return read_quantity("x", text, unit).value


def test_conversions_by_hand() -> None:
    """1 in = 25.4 mm, 1 in2 = 645.16 mm2, 1 ksi = 6.894757 MPa, by definition of the inch."""
    assert si("28 in", "mm") == pytest.approx(711.2, rel=1e-12)
    assert si("6 in2", "mm2") == pytest.approx(6 * 645.16, rel=1e-12)
    assert si("3 ksi", "MPa") == pytest.approx(20.68427, rel=1e-6)


IN, IN2, KSI, KIP = 25.4, 25.4**2, si("1 ksi", "MPa"), si("1 kip", "N")
ACI: dict[str, float] = {"phi_c": 1.0, "phi_s": 1.0, "alpha_1": 0.85, "beta_1": 0.85}


def test_a1_singly_reinforced() -> None:
    """Concrete Design Handbook, 3rd ed. (2006), Chapter 2, Example 2.1 (text opened).

    Exact block: a 64.98 mm, c 72.60 mm, M_r 206.7 kN.m. The printed 209 comes from K_r = 1.8
    read from a table (exact 1.778), so it holds within 1.5 %.
    """
    x: dict[str, float] = {
        "b": 400,
        "d": 539,
        "A_s": 1200,
        "f_c": 30,
        "f_y": 400,
        "phi_c": 0.65,
        "phi_s": 0.85,
    }
    x["alpha_1"] = value(stress_block.ALPHA_1, x)
    x["beta_1"] = value(stress_block.BETA_1, x)
    x["a"] = value(flexure.BLOCK_RECTANGULAR, x)
    assert x["a"] == pytest.approx(64.98, abs=0.005)
    assert value(flexure.NEUTRAL_AXIS, x) == pytest.approx(72.60, abs=0.005)
    M_r = value(flexure.M_R_RECTANGULAR, x) / 1e6
    assert M_r == pytest.approx(206.7, abs=0.05)
    assert M_r == pytest.approx(209, rel=0.015)
    assert x["A_s"] / (x["b"] * x["d"]) == pytest.approx(0.0056, abs=0.00005)


def test_a2_design_cracking_and_minimum() -> None:
    """Concrete Design Handbook, 3rd ed. (2006), Chapter 2, Example 2.2 (text opened)."""
    x: dict[str, float] = {
        "b": 400,
        "b_w": 400,
        "b_t": 400,
        "h": 600,
        "d": 546,
        "f_c": 40,
        "f_y": 400,
    }
    x |= {"lambda_": 1, "phi_c": 0.65, "phi_s": 0.85, "M_f": 415e6}
    x["alpha_1"] = value(stress_block.ALPHA_1, x)
    x["beta_1"] = value(stress_block.BETA_1, x)
    assert x["M_f"] / (x["b"] * x["d"] ** 2) == pytest.approx(3.48, abs=0.005)
    x["a_r"] = value(flexure.BLOCK_REQUIRED, x)
    # 2468 from rho = 0.0113 of a table, three digits
    assert value(flexure.A_S_REQUIRED, x) == pytest.approx(2468, rel=0.002)
    x["I_g"] = value(flange.INERTIA_RECTANGLE, x)
    assert x["I_g"] == pytest.approx(7.2e9, rel=1e-9)
    x["y_b"] = value(flange.CENTROID_RECTANGLE, x)
    x["f_r"] = value(materials.F_R, x)
    M_cr = value(flange.CRACKING_BOTTOM, x) / 1e6
    assert M_cr == pytest.approx(91, abs=0.5)
    assert 1.2 * M_cr == pytest.approx(109, abs=0.5)
    assert value(minimum.A_S_MIN, x) == pytest.approx(759, abs=0.5)
    # the bars selected, 5-25M = 2500 mm2: a 103.5 mm, c 118.9 mm, M_r 420.1 kN.m >= 415
    x["A_s"] = 2500
    x["a"] = value(flexure.BLOCK_RECTANGULAR, x)
    assert x["a"] == pytest.approx(103.5, abs=0.05)
    assert value(flexure.NEUTRAL_AXIS, x) == pytest.approx(118.9, abs=0.1)
    assert value(flexure.M_R_RECTANGULAR, x) / 1e6 == pytest.approx(420.1, abs=0.05)


def test_a4_singly_reinforced() -> None:
    """Wight & MacGregor, 6th ed. (2012), Example 4-1M: from memory, page not opened."""
    x: dict[str, float] = ACI | {"b": 250, "d": 565, "A_s": 1530, "f_c": 20, "f_y": 420}
    x["a"] = value(flexure.BLOCK_RECTANGULAR, x)
    assert x["a"] == pytest.approx(151, abs=0.5)
    c = value(flexure.NEUTRAL_AXIS, x)
    assert c == pytest.approx(178, abs=0.5)
    assert 0.003 * (x["d"] - c) / c == pytest.approx(0.0065, abs=0.00005)
    assert value(flexure.M_R_RECTANGULAR, x) / 1e6 == pytest.approx(314, abs=0.5)


def test_b1_block_in_web() -> None:
    """Nilson, Darwin & Dolan, T beam, capacity of a given section: from memory."""
    x: dict[str, float] = ACI | {
        "b": 28 * IN,
        "h_f": 6 * IN,
        "b_w": 10 * IN,
        "d": 26 * IN,
        "A_s": 7.62 * IN2,
    }
    x |= {"f_c": 3 * KSI, "f_y": 60 * KSI}
    # trial with the flange width: 6.4 in, more than the flange of 6 in
    assert value(flexure.BLOCK_RECTANGULAR, x) / IN == pytest.approx(6.4, abs=0.05)
    x["C_f"] = value(flexure.FLANGE_FORCE, x)
    assert x["C_f"] / x["f_y"] / IN2 == pytest.approx(4.59, abs=0.005)
    x["a_w"] = value(flexure.BLOCK_IN_WEB, x)
    assert x["a_w"] / IN == pytest.approx(7.13, abs=0.01)
    M_n = value(flexure.M_R_TEE, x)
    # printed with the member factor 0.9, to the nearest 10 in-kip, from rounded steps
    assert 0.9 * M_n / (KIP * IN) == pytest.approx(9370, abs=10)
    # SI equivalents kept with the case: M_n 1177 kN.m, a 181 mm, c 213 mm
    assert M_n / 1e6 == pytest.approx(1177, abs=1)
    assert x["a_w"] == pytest.approx(181, abs=0.5)
    assert value(flexure.NEUTRAL_AXIS_IN_WEB, x) == pytest.approx(213, abs=0.5)


def test_b2_block_in_flange() -> None:
    """McCormac & Brown, Chapter 5, Example 5.1: from memory."""
    x: dict[str, float] = ACI | {
        "b": 60 * IN,
        "h_f": 4 * IN,
        "b_w": 10 * IN,
        "d": 24 * IN,
        "A_s": 6.0 * IN2,
    }
    x |= {"f_c": 4 * KSI, "f_y": 60 * KSI}
    T = x["A_s"] * x["f_y"]
    assert pytest.approx(360, abs=0.5) == T / KIP
    x["a"] = value(flexure.BLOCK_RECTANGULAR, x)
    assert x["a"] * x["b"] / IN2 == pytest.approx(105.88, abs=0.005)
    assert x["a"] / IN == pytest.approx(1.76, abs=0.005)
    assert x["a"] < x["h_f"]
    assert value(flexure.NEUTRAL_AXIS, x) / IN == pytest.approx(2.08, abs=0.005)
    M_n = value(flexure.M_R_RECTANGULAR, x)
    assert M_n / T / IN == pytest.approx(23.12, abs=0.005)
    assert 0.9 * M_n / (KIP * IN) == pytest.approx(7490, abs=5)
    assert M_n / 1e6 == pytest.approx(940.3, abs=0.1)


def test_c1_compression_steel_yields() -> None:
    """McCormac & Brown, Chapter 5, Example 5.7: from memory; displaced concrete neglected."""
    x: dict[str, float] = ACI | {
        "b": 14 * IN,
        "d": 24 * IN,
        "d_p": 2.5 * IN,
        "A_s": 6.25 * IN2,
        "A_sp": 2.0 * IN2,
    }
    x |= {"f_c": 3 * KSI, "f_y": 60 * KSI, "E_s": 29000 * KSI, "eps_cu": 0.003}
    strips = strain.block_strips(strain.Section(x["b"], x["b"], 24 * IN), 0.85 * x["f_c"], 0.85)
    layers = [strain.Layer(x["d"], x["A_s"]), strain.Layer(x["d_p"], x["A_sp"])]
    steel = strain.Steel(x["E_s"], x["f_y"], 1.0)
    x["c"] = strain.neutral_axis(strips, layers, steel, 0.003)
    assert x["c"] / IN == pytest.approx(8.4, abs=0.05)
    x["a"] = value(compression_steel.BLOCK, x)
    assert x["a"] / IN == pytest.approx(7.14, abs=0.005)
    assert 0.003 * (x["c"] - x["d_p"]) / x["c"] == pytest.approx(0.00211, abs=0.000005)
    assert 0.003 * (x["d"] - x["c"]) / x["c"] == pytest.approx(0.00557, abs=0.000005)
    x["f_sp"] = value(compression_steel.STRESS, x)
    assert x["f_sp"] == x["f_y"]
    x["C_s"] = value(compression_steel.FORCE_GROSS, x)
    x["C_c"] = value(compression_steel.CONCRETE_FORCE, x)
    M_n = value(compression_steel.M_R, x)
    assert 0.9 * M_n / (KIP * IN) == pytest.approx(7010, abs=5)
    by_layers = strain.moment(strips, layers, steel, 0.003, x["c"])
    assert by_layers == pytest.approx(M_n, rel=1e-6)


def test_d1_cracking_moment_of_tee() -> None:
    """'Calculating of cracking moment for T beam' (April 2019, text opened); own f_r there."""
    x: dict[str, float] = {
        "b_f": 750,
        "h_f": 100,
        "b_w": 150,
        "h": 600,
        "f_c": 27.5,
        "lambda_": 1,
        "f_r": 3.67,
    }
    x["A_g"] = value(flange.AREA_TEE, x)
    x["y_b"] = value(flange.CENTROID_TEE, x)
    x["y_t"] = value(flange.CENTROID_TOP, x)
    x["I_g"] = value(flange.INERTIA_TEE, x)
    assert x["y_b"] == pytest.approx(400)
    assert x["y_t"] == pytest.approx(200)
    assert x["I_g"] == pytest.approx(5.0e9, rel=1e-9)
    assert value(flange.CRACKING_BOTTOM, x) / 1e6 == pytest.approx(45.875, abs=0.0005)
    # own extension, hand calculation: 0.6 sqrt(27.5) = 3.146 MPa; 3.146 x 5e9/400 and /200
    x["f_r"] = value(materials.F_R, x)
    assert value(flange.CRACKING_BOTTOM, x) / 1e6 == pytest.approx(39.33, abs=0.005)
    assert value(flange.CRACKING_TOP, x) / 1e6 == pytest.approx(78.66, abs=0.01)


@pytest.mark.parametrize(("f_c", "rho_b"), [(30, 2.63), (25, 2.24), (35, 3.00), (40, 3.34)])
def test_e3_balanced_ratio(f_c: float, rho_b: float) -> None:
    """A23.3, 10.5.2: c_b/d = 700/1100 = 0.636; rho_b in %: own evaluation, not a printed number.

    f'c 30: 0.805 x 0.895 x 0.65 x 30/(0.85 x 400) x 7/11 = 0.02630;
    f'c 25: 0.8125 x 0.9075 x 0.65 x 25/(0.85 x 400) x 7/11 = 0.02243;
    f'c 35: 0.7975 x 0.8825 x 0.65 x 35/(0.85 x 400) x 7/11 = 0.02997;
    f'c 40: 0.79 x 0.87 x 0.65 x 40/(0.85 x 400) x 7/11 = 0.03345.
    """
    x: dict[str, float] = {
        "f_c": f_c,
        "f_y": 400,
        "phi_c": 0.65,
        "phi_s": 0.85,
        "eps_cu": 0.0035,
        "E_s": 200000,
    }
    x |= {"b": 1000, "d": 1000, "alpha_1": value(stress_block.ALPHA_1, x)}
    x["beta_1"] = value(stress_block.BETA_1, x)
    x["c_b"] = value(stress_block.C_BALANCED, x)
    assert x["c_b"] / x["d"] == pytest.approx(0.636, abs=0.0005)
    assert x["c_b"] / x["d"] == pytest.approx(value(flexure.YIELD_LIMIT, x), rel=1e-12)
    x["a_b"] = value(stress_block.A_BALANCED, x)
    x["C_b"] = value(stress_block.C_BALANCED_RECTANGULAR, x)
    assert value(stress_block.A_S_BALANCED, x) / 1e6 * 100 == pytest.approx(rho_b, abs=0.006)
    assert math.isfinite(value(stress_block.M_R_BALANCED_RECTANGULAR, x))
