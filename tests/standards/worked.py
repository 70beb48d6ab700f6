"""Worked numbers of the catalogue, part 1: materials, stress block, flange, loads, bars, cover.

Each row: the formula, its arguments in printed units, and the calculation written out in plain
numbers, done by hand; the last number of the chain is what the formula must give, in its printed
unit, to the digits written. The test evaluates the chain too, so that the arithmetic is proved.
"""

from __future__ import annotations

from typing import NamedTuple

HAND = "hand calculation"
CHECK_1 = "hand calculation, independent check no. 1"
CHECK_2 = "hand calculation, independent check no. 2"
CHECK_4 = "hand calculation, independent check no. 4"
CHECK_5 = "hand calculation, independent check no. 5"
CHECK_6 = "hand calculation, independent check no. 6"
CHECK_7 = "hand calculation, independent check no. 7"
CHECK_14 = "hand calculation, independent check no. 14"
HANDBOOK_A2 = "Concrete Design Handbook, 3rd ed. (2006), Example 2.2"
CRACKING_D1 = "case D1: published worked example of the cracking moment of a T beam (April 2019)"


class Worked(NamedTuple):
    """One worked number: formula, arguments in printed units, chain, source."""

    place: str
    given: dict[str, float]
    chain: str
    source: str = HAND


W = Worked
MATERIALS = (
    W("materials.E_C_NORMAL", {"f_c": 32}, "4500*sqrt(32) = 4500*5.65685 = 25456"),
    W("materials.E_C_NORMAL", {"f_c": 35}, "4500*sqrt(35) = 26622", CHECK_1),
    W(
        "materials.E_C_GENERAL",
        {"f_c": 35, "gamma_c": 2350},
        "(3300*sqrt(35) + 6900)*(2350/2300)**1.5 = (19523.1 + 6900)*1.032788 = 27289",
        CHECK_1,
    ),
    W("materials.F_R", {"f_c": 35, "lambda_": 1}, "0.6*1*sqrt(35) = 3.550", CHECK_1),
    W("materials.F_R", {"f_c": 25, "lambda_": 0.85}, "0.6*0.85*sqrt(25) = 0.51*5 = 2.55"),
    W("stress_block.ALPHA_1", {"f_c": 35}, "0.85 - 0.0015*35 = 0.7975", CHECK_1),
    W("stress_block.ALPHA_1", {"f_c": 130}, "0.67 = 0.67", "hand: 0.85 - 0.195 = 0.655 < 0.67"),
    W("stress_block.BETA_1", {"f_c": 35}, "0.97 - 0.0025*35 = 0.8825", CHECK_1),
    W("stress_block.BETA_1", {"f_c": 130}, "0.67 = 0.67", "hand: 0.97 - 0.325 = 0.645 < 0.67"),
)
# Balanced: base section d 535, 350 wide, f'c 35, 400 steel; T of b 900, h_f 100, b_w 300, d 600.
BALANCED = (
    W(
        "stress_block.C_BALANCED",
        {"d": 535, "eps_cu": 0.0035, "f_y": 400, "E_s": 200000},
        "535*0.0035/(0.0035 + 400/200000) = 535*7/11 = 340.45",
    ),
    W("stress_block.A_BALANCED", {"beta_1": 0.8825, "c_b": 340.455}, "0.8825*340.455 = 300.45"),
    W(
        "stress_block.C_BALANCED_RECTANGULAR",
        {"alpha_1": 0.7975, "phi_c": 0.65, "f_c": 35, "b": 350, "a_b": 300.451},
        "0.7975*0.65*35*350*300.451/1e3 = 18.143125*105157.85/1e3 = 1907.9",
    ),
    W(
        "stress_block.C_BALANCED_TEE",
        {
            "alpha_1": 0.7975,
            "phi_c": 0.65,
            "f_c": 35,
            "b": 900,
            "b_w": 300,
            "h_f": 100,
            "a_b": 336.95,
        },
        "18.143125*((900 - 300)*100 + 300*336.95)/1e3 = 18.143125*161085/1e3 = 2922.6",
    ),
    # rho_b of check no. 5a is 0.02997: 0.02997 x 350 x 535 = 5612 mm2
    W(
        "stress_block.A_S_BALANCED",
        {"C_b": 1907.9, "phi_s": 0.85, "f_y": 400},
        "1907900/(0.85*400) = 1907900/340 = 5611.5",
        CHECK_5 + "a: rho_b 0.02997",
    ),
    W(
        "stress_block.M_R_BALANCED_RECTANGULAR",
        {"C_b": 1907.9, "d": 535, "a_b": 300.451},
        "1907900*(535 - 300.451/2)/1e6 = 1907900*384.7745/1e6 = 734.11",
    ),
    W(
        "stress_block.M_R_BALANCED_TEE",
        {
            "alpha_1": 0.7975,
            "phi_c": 0.65,
            "f_c": 35,
            "b": 900,
            "b_w": 300,
            "h_f": 100,
            "d": 600,
            "a_b": 336.95,
        },
        "18.143125*(600*100*(600 - 50) + 300*336.95*(600 - 336.95/2))/1e6"
        " = 18.143125*(33000000 + 101085*431.525)/1e6 = 1390.1",
    ),
)
# Flange: check no. 4 (span 9000, slab 130, clear 2600, web 350); the gallery beam of 3100 spacing.
FLANGE = (
    W("flange.CLEAR_DISTANCE", {"s_b": 3.1, "b_w": 380}, "3100 - 380 = 2720"),
    W(
        "flange.OVERHANG_T_SIMPLE",
        {"l": 9, "h_f": 130, "l_w": 2600},
        "min(9000/5, 12*130, 2600/2) = min(1800, 1560, 1300) = 1300",
        CHECK_4,
    ),
    W(
        "flange.OVERHANG_T_SIMPLE",
        {"l": 9, "h_f": 100, "l_w": 2600},
        "min(9000/5, 12*100, 2600/2) = min(1800, 1200, 1300) = 1200",
    ),
    W(
        "flange.OVERHANG_T_CONTINUOUS",
        {"l": 9, "h_f": 130, "l_w": 2600},
        "min(9000/10, 12*130, 2600/2) = min(900, 1560, 1300) = 900",
        CHECK_4,
    ),
    W(
        "flange.OVERHANG_L",
        {"l": 9, "h_f": 130, "l_w": 2600},
        "min(9000/12, 6*130, 2600/2) = min(750, 780, 1300) = 750",
        CHECK_4,
    ),
    W("flange.WIDTH_T", {"b_w": 350, "b_o": 1300}, "350 + 2*1300 = 2950", CHECK_4),
    W("flange.WIDTH_L", {"b_w": 350, "b_o": 750}, "350 + 750 = 1100", CHECK_4),
    W(
        "flange.AREA_TEE",
        {"b_w": 150, "h": 600, "b_f": 750, "h_f": 100},
        "150*600 + 600*100 = 90000 + 60000 = 150000",
        CRACKING_D1,
    ),
    W(
        "flange.CENTROID_TEE",
        {"b_w": 150, "h": 600, "b_f": 750, "h_f": 100, "A_g": 150000},
        "(90000*300 + 60000*550)/150000 = 60000000/150000 = 400",
        CRACKING_D1,
    ),
    W(
        "flange.INERTIA_TEE",
        {"b_w": 150, "h": 600, "b_f": 750, "h_f": 100, "y_b": 400},
        "150*600**3/12 + 90000*100**2 + 600*100**3/12 + 60000*150**2"
        " = 2.7e9 + 0.9e9 + 0.05e9 + 1.35e9 = 5.000e9",
        CRACKING_D1,
    ),
    W("flange.AREA_RECTANGLE", {"b_w": 400, "h": 600}, "400*600 = 240000"),
    W("flange.CENTROID_RECTANGLE", {"h": 600}, "600/2 = 300"),
    W("flange.INERTIA_RECTANGLE", {"b_w": 400, "h": 600}, "400*600**3/12 = 7.200e9", HANDBOOK_A2),
    W("flange.CENTROID_TOP", {"h": 600, "y_b": 400}, "600 - 400 = 200", CRACKING_D1),
    W(
        "flange.CRACKING_BOTTOM",
        {"f_r": 3.67, "I_g": 5e9, "y_b": 400},
        "3.67*5e9/400/1e6 = 45.875",
        CRACKING_D1,
    ),
    W(
        "flange.CRACKING_TOP",
        {"f_r": 3.67, "I_g": 5e9, "y_t": 200},
        "3.67*5e9/200/1e6 = 91.75",
        "hand calculation, twice the published 45.875 of case D1",
    ),
)
LOADS = (
    W("loads.TRIBUTARY", {"s_b": 3.1}, "3.1/2 + 3.1/2 = 3.1"),
    W("loads.SLAB", {"gamma_w": 24, "h_f": 140, "b_tr": 3.1}, "24*0.14*3.1 = 10.416"),
    W(
        "loads.WEB",
        {"gamma_w": 24, "b_w": 380, "h": 620, "h_f": 140},
        "24*0.38*(0.62 - 0.14) = 24*0.38*0.48 = 4.3776",
    ),
    W("loads.BEAM", {"gamma_w": 24, "b_w": 380, "h": 620}, "24*0.38*0.62 = 5.6544"),
    W("loads.SUPERIMPOSED", {"q_SD": 1.8, "b_tr": 3.1}, "1.8*3.1 = 5.58"),
    W("loads.PARTITIONS", {"q_pt": 1.0, "b_tr": 3.1}, "1.0*3.1 = 3.1"),
    W("loads.SNOW", {"q_S": 1.6, "b_tr": 2.5}, "1.6*2.5 = 4.0"),
    W("loads.CONSTRUCTION", {"q_cn": 2.4, "b_tr": 3.1}, "2.4*3.1 = 7.44"),
    W(
        "loads.DEAD_WITH_SLAB",
        {"w_sl": 10.416, "w_wb": 4.3776, "w_SD": 5.58},
        "10.416 + 4.3776 + 5.58 = 20.3736",
    ),
    W("loads.FLOOR", {"q_fl": 3.4, "b_tr": 3.1}, "3.4*3.1 = 10.54"),
    W(
        "loads.DEAD_BEAM",
        {"w_bm": 5.6544, "w_fl": 10.54, "w_SD": 5.58},
        "5.6544 + 10.54 + 5.58 = 21.7744",
    ),
    W("loads.LIVE", {"q_L": 4.8, "b_tr": 3.1}, "4.8*3.1 = 14.88"),
    W("loads.MOMENT_SIMPLE", {"w_f": 48, "l": 8}, "48*8**2/8 = 384"),
    W("loads.SHEAR_SIMPLE", {"w_f": 48, "l": 8}, "48*8/2 = 192"),
    W("loads.REACTION_DEAD", {"w_D": 20, "l": 8}, "20*8/2 = 80"),
    W("loads.REACTION_LIVE", {"w_L": 15, "l": 8}, "15*8/2 = 60"),
    W("loads.MOMENT_END_GIRDER", {"w_f": 48, "l": 8}, "48*8**2/24 = 128"),
    W("loads.MOMENT_END_COLUMN", {"w_f": 48, "l": 8}, "48*8**2/16 = 192"),
    W("combinations.CASE_1", {"w_D": 12.4}, "1.4*12.4 = 17.36", CHECK_2),
    W("combinations.CASE_2", {"w_D": 12.4, "w_L": 9}, "1.25*12.4 + 1.5*9 = 15.5 + 13.5 = 29.0"),
    W("combinations.GOVERNING", {"w_f1": 17.36, "w_f2": 29}, "max(17.36, 29) = 29"),
    W("combinations.GOVERNING", {"w_f1": 17.36, "w_f2": 16}, "max(17.36, 16) = 17.36"),
)
# Bars: 25M are 25.2 mm and 500 mm2, 10M stirrups 11.3 mm with an inside bend radius of 22.5 mm.
BARS = (
    W(
        "bars.LEAST_CLEAR",
        {"d_b": 25.2, "a_max": 20},
        "max(1.4*25.2, 1.4*20, 30) = max(35.28, 28, 30) = 35.28",
    ),
    W(
        "bars.LEAST_CLEAR",
        {"d_b": 16, "a_max": 20},
        "max(1.4*16, 1.4*20, 30) = max(22.4, 28, 30) = 30.00",
    ),
    W(
        "bars.LEAST_CLEAR",
        {"d_b": 16, "a_max": 28},
        "max(1.4*16, 1.4*28, 30) = max(22.4, 39.2, 30) = 39.20",
    ),
    W(
        "bars.CLEAR",
        {"b_w": 380, "c_c": 30, "d_bs": 11.3, "r_s": 22.5, "d_b": 25.2, "n_b": 4},
        "(380 - 2*(30 + 11.3 + 22.5))/3 - 25.2 = 252.4/3 - 25.2 = 58.93",
    ),
    W(
        "bars.CLEAR",
        {"b_w": 500, "c_c": 40, "d_bs": 11.3, "r_s": 22.5, "d_b": 56.4, "n_b": 3},
        "(500 - 2*(40 + 11.3 + 28.2))/2 - 56.4 = 341/2 - 56.4 = 114.1",
    ),
    W(
        "bars.DEPTH_FIRST",
        {"h": 600, "c_c": 40, "d_bs": 11.3, "d_b": 25.2},
        "600 - 40 - 11.3 - 12.6 = 536.1",
    ),
    W(
        "bars.LAYER_DISTANCE",
        {"d_b": 29.9, "a_max": 20},
        "max(1.4*29.9, 1.4*20, 30) = max(41.86, 28, 30) = 41.86",
    ),
    W(
        "bars.DEPTH_SECOND",
        {"d_1": 536.1, "d_b": 25.2, "s_l": 35.28, "d_b2": 19.5},
        "536.1 - 12.6 - 35.28 - 9.75 = 478.47",
    ),
    W(
        "bars.DEPTH_TWO_LAYERS",
        {"A_s1": 2000, "d_1": 536, "A_s2": 1000, "d_2": 476},
        "(2000*536 + 1000*476)/3000 = 1548000/3000 = 516",
    ),
    W("bars.TOP_AREA_T", {"n_t": 2, "n_o": 3, "A_b": 200}, "(2 + 2*3)*200 = 1600"),
    W("bars.TOP_AREA_L", {"n_t": 2, "n_o": 3, "A_b": 200}, "(2 + 3)*200 = 1000"),
    W("bars.TOP_AREA_RECTANGULAR", {"n_t": 4, "A_b": 300}, "4*300 = 1200"),
    W("bars.COMPRESSION_AREA", {"n_c": 3, "A_b": 300}, "3*300 = 900"),
    W(
        "bars.COMPRESSION_DEPTH",
        {"c_c": 40, "d_bs": 11.3, "d_b": 19.5},
        "40 + 11.3 + 9.75 = 61.05",
    ),
    # Concrete Design Handbook, Example 2.1: 600 - 40 - 11.3 - 19.5/2, read there as 539
    W(
        "bars.DEPTH_ONE_LAYER",
        {"h": 600, "c_c": 40, "d_bs": 11.3, "d_b": 19.5},
        "600 - 40 - 11.3 - 19.5/2 = 538.95",
        "Concrete Design Handbook, 3rd ed. (2006), Example 2.1",
    ),
    W("bars.AREA_OF_BARS", {"n_b": 4, "A_b": 500}, "4*500 = 2000", CHECK_5),
    W("bars.TOTAL_AREA", {"A_s1": 2000, "A_s2": 1000}, "2000 + 1000 = 3000"),
    W("bars.STANDING_AREA", {"A_s1": 1500, "A_s2": 600}, "1500 + 600 = 2100"),
    W("cover.COVER_TO_BARS", {"c_c": 30, "d_bs": 11.3}, "30 + 11.3 = 41.3"),
    W(
        "cover.COVER_REQUIRED_STIRRUP",
        {"c_min": 40, "r_cb": 1.5, "d_bs": 16, "r_ca": 1.5, "a_max": 28},
        "max(40, 1.5*16, 1.5*28) = max(40, 24, 42) = 42",
    ),
    W(
        "cover.COVER_REQUIRED_BAR",
        {"c_min": 60, "r_cb": 2, "d_b": 35.7, "r_ca": 2, "a_max": 20},
        "max(60, 2*35.7, 2*20) = max(60, 71.4, 40) = 71.4",
    ),
)
WORKED = (*MATERIALS, *BALANCED, *FLANGE, *LOADS, *BARS)
