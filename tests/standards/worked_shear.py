"""Worked numbers of the catalogue, part 3: shear, torsion, interface shear, bearing.

Base beam of the independent checks: b = b_w = 350, h = 600, d = 535, A_s = 2000, f'c = 35,
f_y = 400, lambda = 1, cover 40, 10M stirrups (A_v = 200) at 225; d_v = 481.5.  cot 35 = 1.428148.
"""

from __future__ import annotations

from .worked import Worked

W = Worked
CHECK_8 = "hand calculation, independent check no. 8"
CHECK_9 = "hand calculation, independent check no. 9"
CHECK_10 = "hand calculation, independent check no. 10"
CHECK_13 = "hand calculation, independent check no. 13"
C = {"phi_c": 0.65, "f_c": 35, "lambda_": 1}
WEB = {"b_w": 350, "d_v": 481.5}
S = {"phi_s": 0.85, "f_y": 400}
STIRRUPS = {**S, "A_v": 200, "s": 225}
SHEAR = (
    W(
        "shear.D_V",
        {"d": 535, "h": 600},
        "max(0.9*535, 0.72*600) = max(481.5, 432) = 481.5",
        CHECK_8,
    ),
    W("shear.CRITICAL_AT_D_V", {"b_sn": 450, "d_v": 481.5}, "(450/2 + 481.5)/1e3 = 0.7065"),
    W("shear.CRITICAL_AT_FACE", {"b_sn": 450}, "450/2/1e3 = 0.225"),
    W("shear.STIRRUP_LEGS", {"n_v": 2, "A_t": 100}, "2*100 = 200"),
    # half a depth from the change the zone counts whole; at the change the mean of A_v/s
    W(
        "shear.BESIDE_CHANGE",
        {"s": 150, "s_n": 300, "x_z": 120, "h": 600},
        "1/(0.7/150 + 0.3/300) = 1/(0.0046667 + 0.001) = 176.5",
    ),
    W("shear.BESIDE_END", {"s": 150, "x_z": 120, "h": 600}, "150/(0.5 + 0.2) = 214.3"),
    W("shear.D_V", {"d": 460, "h": 600}, "max(0.9*460, 0.72*600) = max(414, 432) = 432.0"),
    W(
        "shear.V_C",
        {**C, **WEB, "beta": 0.18},
        "0.65*1*0.18*sqrt(35)*350*481.5/1e3 = 0.117*5.91608*168.525 = 116.6",
        CHECK_8,
    ),
    W(
        "shear.V_C",
        {**C, **WEB, "beta": 0.1895},
        "0.65*1*0.1895*5.91608*168.525 = 122.8",
        CHECK_9,
    ),
    # the root is capped: sqrt(80) = 8.94 counts as 8
    W(
        "shear.V_C",
        {**C, **WEB, "beta": 0.18, "f_c": 80, "lambda_": 0.85},
        "0.65*0.85*0.18*8*168.525 = 0.09945*1348.2 = 134.1",
    ),
    W(
        "shear.V_S",
        {**STIRRUPS, "d_v": 481.5, "theta": 35},
        "0.85*200*400*481.5*cot(35)/225/1e3 = 0.068*481.5*1.428148/0.225 = 207.8",
        CHECK_8,
    ),
    W(
        "shear.V_S",
        {**STIRRUPS, "d_v": 481.5, "theta": 34.18},
        "0.068*481.5*cot(34.18)/0.225 = 145.52*1.4727 = 214.3",
        CHECK_9,
    ),
    W(
        "shear.V_R_MAX",
        {"phi_c": 0.65, "f_c": 35, **WEB},
        "0.25*0.65*35*350*481.5/1e3 = 5.6875*168.525 = 958.5",
        CHECK_8,
    ),
    W(
        "shear.V_R",
        {"V_c": 116.65, "V_s": 207.83, "V_rmax": 958.5},
        "min(116.65 + 207.83, 958.5) = 324.5",
        CHECK_8,
    ),
    W("shear.V_R", {"V_c": 116.65, "V_s": 900, "V_rmax": 958.5}, "min(1016.65, 958.5) = 958.5"),
    # 120 kN and 41.6 kN.m over 8 m
    W("shear.WITH_RESTRAINT", {"V_f": 120, "M_f": 41.6, "l": 8}, "120 + 41.6/8 = 125.2"),
    W("shear.V_R_PLAIN", {"V_c": 100.6}, "100.6 = 100.6"),
    W(
        "shear.A_V_MIN",
        {"f_c": 35, "b_w": 350, "s": 225, "f_y": 400},
        "0.06*sqrt(35)*350*225/400 = 0.354965*196.875 = 69.88",
    ),
    W(
        "shear.SPACING_MINIMUM",
        {"f_c": 35, "b_w": 350, "A_v": 200, "f_y": 400},
        "200*400/(0.06*sqrt(35)*350) = 80000/124.238 = 644",
        CHECK_8,
    ),
    # back from V_s 207.83 kN to the spacing of 225 mm
    W(
        "shear.SPACING_REQUIRED",
        {**S, "A_v": 200, "d_v": 481.5, "theta": 35, "V_f": 324.48, "V_c": 116.65},
        "68000*481.5*1.428148/207830 = 225.0",
        CHECK_8,
    ),
    W("shear.S_MAX", {"d_v": 481.5}, "min(0.7*481.5, 600) = 337", CHECK_8),
    W("shear.S_MAX", {"d_v": 900}, "min(630, 600) = 600.0"),
    W("shear.S_MAX_HALVED", {"d_v": 481.5}, "0.5*min(0.7*481.5, 600) = 168.5", CHECK_10),
    W("shear_factors.BETA_D_V", {"d_v": 481.5}, "230/(1000 + 481.5) = 0.1552", CHECK_8 + "b"),
    W("shear_factors.BETA_S_ZE", {"s_ze": 581.1}, "230/(1000 + 581.1) = 0.1455", CHECK_8 + "b"),
    W("shear_factors.A_G", {"a_max": 20, "f_c": 35}, "20*min((70 - 35)/10, 1) = 20.0"),
    W("shear_factors.A_G", {"a_max": 20, "f_c": 64}, "20*(70 - 64)/10 = 12.0"),
    W("shear_factors.A_G", {"a_max": 20, "f_c": 75}, "20*max(-0.5, 0) = 0.0"),
    W("shear_factors.S_Z", {"d_v": 481.5}, "481.5 = 481.5"),
    W("shear_factors.S_Z_LAYERS", {"d_v": 900, "s_ly": 250}, "min(900, 250) = 250"),
    W(
        "shear_factors.S_ZE",
        {"s_z": 481.5, "a_g": 14},
        "max(35*481.5/(15 + 14), 0.85*481.5) = max(16852.5/29, 409.3) = 581.1",
        CHECK_8 + "b",
    ),
    W("shear_factors.S_ZE", {"s_z": 481.5, "a_g": 40}, "max(16852.5/55, 0.85*481.5) = 409.3"),
    W(
        "shear_factors.EPS_X",
        {"M_f": 160, "d_v": 481.5, "V_f": 260, "E_s": 200000, "A_s": 2000},
        "(160e6/481.5 + 260e3)/(2*200000*2000) = (332295 + 260000)/8e8 = 0.000740",
        CHECK_9,
    ),
    # M_f is at least V_f d_v = 260 x 0.4815 = 125.2 kN.m
    W(
        "shear_factors.EPS_X",
        {"M_f": 50, "d_v": 481.5, "V_f": 260, "E_s": 200000, "A_s": 2000},
        "(260e3 + 260e3)/8e8 = 0.000650",
    ),
    W(
        "shear_factors.LEAST_BARS",
        {"M_f": 160, "d_v": 481.5, "V_f": 260, "E_s": 200000},
        "(160e6/481.5 + 260e3)/(2*200000*0.003) = (332295 + 260000)/1200 = 493.6",
    ),
    W(
        "shear_factors.BETA_STIRRUPS",
        {"eps_x": 0.00074037},
        "0.40/(1 + 1500*0.00074037) = 0.4/2.110555 = 0.1895",
        CHECK_9,
    ),
    W(
        "shear_factors.BETA_GENERAL",
        {"eps_x": 0.00074037, "s_ze": 300},
        "0.4/2.110555*1300/(1000 + 300) = 0.1895",
        CHECK_9,
    ),
    W(
        "shear_factors.BETA_GENERAL",
        {"eps_x": 0.00085, "s_ze": 481.5},
        "0.40/2.275*1300/1481.5 = 0.175824*0.877489 = 0.15428",
    ),
    W("shear_factors.THETA", {"eps_x": 0.00074037}, "29 + 7000*0.00074037 = 34.18", CHECK_9),
    # 0.00085 belongs to the angle of the simplified method: 29 + 5.95, about 35
    W("shear_factors.THETA", {"eps_x": 0.00085}, "29 + 7000*0.00085 = 34.95"),
)
LONGITUDINAL = (
    W(
        "shear_bars.TENSION_SIDE",
        {"M_f": 160, "d_v": 481.5, "V_f": 260, "V_s": 207.83, "theta": 35},
        "160/0.4815 + (260 - 0.5*207.83)*cot(35) = 332.295 + 156.085*1.428148 = 555.2",
        CHECK_9 + "b",
    ),
    W(
        "shear_bars.TENSION_SIDE",
        {"M_f": 160, "d_v": 481.5, "V_f": 200, "V_s": 207.8, "theta": 35},
        "160/0.4815 + 100*cot(35) = 475.1",
    ),
    W(
        "shear_bars.TENSION_SIDE_CAPPED",
        {"F_lt": 555.2, "phi_s": 0.85, "A_sr": 1500, "f_y": 400},
        "min(555.2, 0.85*1500*0.4) = min(555.2, 510) = 510.0",
    ),
    W(
        "shear_bars.COMPRESSION_SIDE",
        {"M_f": 50, "d_v": 481.5, "V_f": 260, "V_s": 207.83, "theta": 35},
        "156.085*1.428148 - 50/0.4815 = 222.91 - 103.84 = 119.07",
    ),
    W(
        "shear_bars.COMPRESSION_SIDE",
        {"M_f": 160, "d_v": 481.5, "V_f": 260, "V_s": 207.83, "theta": 35},
        "max(222.91 - 332.30, 0) = 0.00",
    ),
    W(
        "shear_bars.END_SUPPORT",
        {"V_f": 260, "V_s": 207.83, "theta": 35},
        "(260 - 0.5*207.83)*cot(35) = 156.085*1.428148 = 222.9",
        CHECK_9 + "b",
    ),
    # stirrups stronger than the shear count only as far as it goes
    W(
        "shear_bars.END_SUPPORT",
        {"V_f": 100, "V_s": 207.83, "theta": 35},
        "(100 - 50)*1.428148 = 71.41",
    ),
    W("shear_bars.AREA_TENSION_SIDE", {**S, "F_lt": 555.2}, "555200/340 = 1633"),
    W("shear_bars.AREA_END_SUPPORT", {**S, "F_le": 222.9}, "222900/340 = 656", CHECK_9 + "b"),
    W("shear_bars.HANGER_LEGS", {"n_h": 3, "A_v": 200}, "3*200 = 600"),
    W("shear_bars.HANGERS", {**S, "R_f": 204}, "204000/(0.85*400) = 600"),
)
SIDES: dict[str, float] = {"b_w": 350, "h": 600}
COVER = {**SIDES, "c_c": 40, "d_bs": 11.3}
TORSION = (
    W("torsion.AREA_RECTANGLE", SIDES, "350*600 = 210000", CHECK_10),
    W("torsion.PERIMETER_RECTANGLE", SIDES, "2*(350 + 600) = 1900", CHECK_10),
    W(
        "torsion.AREA_OF_STIRRUP",
        COVER,
        "(350 - 80 - 11.3)*(600 - 80 - 11.3) = 258.7*508.7 = 131601",
        CHECK_10,
    ),
    W("torsion.PERIMETER_OF_STIRRUP", COVER, "2*(258.7 + 508.7) = 1534.8", CHECK_10),
    W("torsion.A_O", {"A_oh": 131601}, "0.85*131601 = 111861"),
    W(
        "torsion.T_CR",
        {**C, "A_c": 210000, "p_c": 1900},
        "210000**2/1900*0.38*0.65*sqrt(35)/1e6 = 23.210526*0.247*5.91608 = 33.92",
        CHECK_10,
    ),
    W("torsion.OVERHANG", {"b_o": 900, "h": 600, "h_f": 130}, "min(900, 600 - 130, 520) = 470"),
    W(
        "torsion.AREA_L",
        {**SIDES, "b_pf": 470, "h_f": 130},
        "350*600 + 470*130 = 210000 + 61100 = 271100",
    ),
    W("torsion.PERIMETER_L", {**SIDES, "b_pf": 470}, "2*(350 + 600 + 470) = 2840"),
    W("torsion.AREA_T", {**SIDES, "b_pf": 470, "h_f": 130}, "210000 + 2*61100 = 332200"),
    W("torsion.PERIMETER_T", {**SIDES, "b_pf": 470}, "2*(350 + 600 + 940) = 3780"),
    W(
        "torsion.T_CR_FLANGE",
        {**C, "A_c": 210000, "p_c": 1900, "A_cf": 271100, "p_cf": 2840},
        "271100**2/2840*0.38*0.65*sqrt(35)/1e6 = 25.878595*0.247*5.91608 = 37.82",
    ),
    W("torsion.TORQUE", {"t_f": 8, "l_n": 7.15, "x_n": 481.5}, "8*(3.575 - 0.4815) = 24.748"),
    W("torsion.TORQUE_CANTILEVER", {"t_f": 8, "l_n": 2.0, "x_n": 481.5}, "8*(2 - 0.4815) = 12.148"),
    W("torsion.FROM_FACE", {"x_f": 1.225, "b_sn": 450}, "1225 - 450/2 = 1000"),
    W("torsion.LEGS_LEFT", {"A_v": 200, "a_t": 0.258, "s": 150}, "200 - 2*0.258*150 = 122.6"),
    W("torsion.COMPATIBILITY", {"T_f": 28, "T_cr": 33.92}, "min(28, 0.67*33.92) = 22.73"),
    W("torsion.COMPATIBILITY", {"T_f": 20, "T_cr": 33.92}, "min(20, 22.73) = 20.00"),
    W(
        "torsion.T_R",
        {**S, "A_o": 111861, "A_t": 100, "theta": 35, "s": 225},
        "2*111861*0.85*100*400*1.428148/225/1e6 = 7606.548*1.428148/225 = 48.28",
    ),
    W(
        "torsion.LEG_FOR_TORSION",
        {**S, "T_f": 28, "A_o": 111861, "theta": 35},
        "28e6/(2*111861*0.85*400*1.428148) = 28e6/108632761 = 0.258",
        CHECK_10,
    ),
    W(
        "torsion.LEGS_FOR_SHEAR",
        {**S, "V_f": 260, "V_c": 116.65, "d_v": 481.5, "theta": 35},
        "143350/(340*481.5*1.428148) = 143350/233802 = 0.6131",
    ),
    W(
        "torsion.LEGS_FOR_SHEAR",
        {**S, "V_f": 100, "V_c": 116.65, "d_v": 481.5, "theta": 35},
        "max(100 - 116.65, 0) = 0.000",
    ),
    W("torsion.LEGS", {"a_v": 0.6131, "a_t": 0.2577}, "0.6131 + 2*0.2577 = 1.1285"),
    W(
        "torsion.SHEAR_IN_STRAIN",
        {"V_f": 260, "p_h": 1534.8, "T_f": 28, "A_o": 111861},
        "sqrt(260**2 + (0.9*1534.8*28e6/(2*111861)/1e3)**2) = sqrt(67600 + 172.878**2) = 312.2",
    ),
    W(
        "torsion.EPS_X",
        {"M_f": 160, "d_v": 481.5, "V_f": 260, "V_fe": 312.2, "E_s": 200000, "A_s": 2000},
        "(332295 + 312200)/8e8 = 0.0008056",
    ),
    W(
        "torsion.LEAST_BARS",
        {"M_f": 160, "d_v": 481.5, "V_f": 260, "V_fe": 312.2, "E_s": 200000},
        "(332295 + 312200)/1200 = 537.1",
    ),
    W(
        "torsion.SHEAR_IN_BARS",
        {"V_f": 260, "V_s": 207.83, "p_h": 1534.8, "T_f": 28, "A_o": 111861},
        "sqrt(156.085**2 + (0.45*1534.8*28e6/(2*111861)/1e3)**2)"
        " = sqrt(24362.5 + 86.439**2) = 178.4",
        CHECK_10,
    ),
    W(
        "torsion.TENSION_SIDE",
        {"M_f": 160, "d_v": 481.5, "V_le": 178.4, "theta": 35},
        "332.295 + 178.4*1.428148 = 332.295 + 254.782 = 587.1",
    ),
    W(
        "torsion.COMPRESSION_SIDE",
        {"M_f": 50, "d_v": 481.5, "V_le": 178.4, "theta": 35},
        "254.782 - 50/0.4815 = 254.782 - 103.842 = 150.9",
    ),
    W(
        "torsion.END_SUPPORT",
        {"V_f": 260, "V_s": 207.83, "p_h": 1534.8, "T_f": 28, "A_o": 111861, "theta": 35},
        "sqrt(156.085**2 + 86.439**2)*cot(35) = 178.42*1.42815 = 254.8",
        CHECK_10,
    ),
    W(
        "torsion.END_SUPPORT",
        {"V_f": 100, "V_s": 207.83, "p_h": 1534.8, "T_f": 28, "A_o": 111861, "theta": 35},
        "sqrt(50**2 + 86.439**2)*cot(35) = 99.858*1.42815 = 142.6",
        CHECK_10,
    ),
)
# Interface of check no. 13: monolithic, 2-10M at 250 across a flange of 130.
PLANE = {**C, "c_v": 1.0, "mu": 1.4}
INTERFACE = (
    W("interface.BARS_ACROSS", {"n_f": 2, "A_b": 100}, "2*100 = 200", CHECK_13),
    W("interface.RATIO", {"A_vf": 200, "A_cv": 32500}, "200/32500 = 0.00615", CHECK_13),
    W(
        "interface.RATIO_FLANGE",
        {"A_vf": 200, "s_f": 250, "h_f": 130},
        "200/(250*130) = 0.00615",
        CHECK_13,
    ),
    W("interface.COMPRESSION", {"rho_v": 0.0061538, "f_y": 400}, "0.0061538*400 = 2.46", CHECK_13),
    W(
        "interface.COMPRESSION_INCLINED",
        {"rho_v": 0.0061538, "f_y": 400, "alpha_f": 60},
        "0.0061538*400*sqrt(3)/2 = 2.46152*0.8660254 = 2.1317",
    ),
    W(
        "interface.RESISTANCE",
        {**PLANE, "sigma": 2.4615},
        "0.65*(1.0 + 1.4*2.4615) = 0.65*4.4461 = 2.89",
        CHECK_13,
    ),
    W(
        "interface.RESISTANCE",
        {**PLANE, "sigma": 8},
        "min(0.65*(1.0 + 1.4*8), 0.25*0.65*35) = min(7.93, 5.6875) = 5.69",
        CHECK_13,
    ),
    W(
        "interface.RESISTANCE_INCLINED",
        {**PLANE, **S, "sigma": 2.1317, "rho_v": 0.0061538, "alpha_f": 60},
        "0.65*(1.0 + 1.4*2.1317) + 0.85*2.46152*0.5 = 2.589847 + 1.046146 = 3.636",
    ),
    W(
        "interface.RESISTANCE_ALTERNATIVE",
        {**C, "k_i": 0.6, "sigma": 2.4615},
        "0.65*0.6*sqrt(2.4615*35) = 0.39*9.28186 = 3.620",
    ),
    W(
        "interface.OVERHANG_IN_FLANGE",
        {**S, "A_s": 2000, "b_o": 900, "b": 2150},
        "0.85*2000*0.4*900/2150 = 680*0.418605 = 284.65",
    ),
    W(
        "interface.OVERHANG_BLOCK_IN_WEB",
        {"C_f": 1088.6, "b_o": 300, "b": 900, "b_w": 300},
        "1088.6*300/(900 - 300) = 544.3",
    ),
    W(
        "interface.OVERHANG_TENSION",
        {**S, "n_o": 3, "A_b": 200, "M_f": 90, "M_r": 150},
        "0.85*3*200*0.4*90/150 = 122.4",
    ),
    W(
        "interface.OVERHANG_TENSION",
        {**S, "n_o": 3, "A_b": 200, "M_f": 160, "M_r": 150},
        "0.85*3*200*0.4*1 = 204",
    ),
    W(
        "interface.OVERHANG_TENSION_IN_PART",
        {**S, "n_o": 3, "A_b": 200, "M_f": 90, "M_r": 150, "l_av": 350, "l_d": 700},
        "0.85*3*200*0.5*0.4*90/150 = 61.2",
    ),
    W("interface.LENGTH", {"x_vz": 200, "x_vm": 3144}, "max(200 - 3144, 3144 - 200)/1000 = 2.944"),
    W(
        "interface.LENGTH_RESTRAINED",
        {"l": 7.6, "n_rm": 24, "b_sp": 400},
        "max(15.2/24 - 0.2, 7.6/24) = max(0.43333, 0.31667) = 0.43333",
    ),
    W("interface.LENGTH_QUARTER", {"l_n": 7.175}, "7.175/4 = 1.79375"),
    W(
        "interface.STRESS",
        {"F_o": 284.65, "h_f": 130, "l_vf": 1.9},
        "284650/(130*1900) = 284650/247000 = 1.1524",
    ),
)
BEARING = (
    W("bearing.LOADED_AREA", {"b_w": 350, "l_b": 200}, "350*200 = 70000"),
    W("bearing.LOADED_AREA_NARROW", {"b_w": 350, "b_col": 250, "l_b": 200}, "250*200 = 50000"),
    W(
        "bearing.RESISTANCE",
        {"phi_c": 0.65, "f_c": 35, "A_1": 70000, "A_2": 157500},
        "0.85*0.65*35*70000*sqrt(2.25)/1e3 = 19.3375*70*1.5 = 2030.4",
    ),
    W(
        "bearing.RESISTANCE",
        {"phi_c": 0.65, "f_c": 35, "A_1": 70000, "A_2": 700000},
        "19.3375*70*2 = 2707.3",
        "hand calculation: sqrt(10) = 3.16 counts as 2",
    ),
)
WORKED_SHEAR = (*SHEAR, *LONGITUDINAL, *TORSION, *INTERFACE, *BEARING)
