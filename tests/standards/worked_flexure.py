"""Worked numbers of the catalogue, part 2: resistance, minimum, crack control, capacity."""

from __future__ import annotations

from .worked import CHECK_5, CHECK_6, CHECK_7, CHECK_14, HANDBOOK_A2, Worked

W = Worked
# alpha_1 phi_c f'c = 0.7975*0.65*35 = 18.143125 MPa for the f'c of 35 MPa of the checks
BASE = {"alpha_1": 0.7975, "phi_c": 0.65, "f_c": 35}
TEE = {"b": 900, "b_w": 300, "h_f": 100}
FLEXURE = (
    W(
        "flexure.BLOCK_RECTANGULAR",
        {**BASE, "phi_s": 0.85, "A_s": 2000, "f_y": 400, "b": 350},
        "0.85*2000*400/(0.7975*0.65*35*350) = 680000/6350.094 = 107.1",
        CHECK_5 + "a",
    ),
    W(
        "flexure.FLANGE_FORCE",
        {**BASE, **TEE},
        "18.143125*(900 - 300)*100/1e3 = 1088.6",
        CHECK_5 + "b",
    ),
    W(
        "flexure.BLOCK_IN_WEB",
        {**BASE, "phi_s": 0.85, "A_s": 7000, "f_y": 400, "C_f": 1088.5875, "b_w": 300},
        "(0.85*7000*400 - 1088587.5)/(18.143125*300) = 1291412.5/5442.9375 = 237.3",
        CHECK_5 + "b",
    ),
    W(
        "flexure.NEUTRAL_AXIS",
        {"a": 107.085, "beta_1": 0.8825},
        "107.085/0.8825 = 121.3",
        CHECK_5 + "a",
    ),
    # c/d 0.448 of check no. 5b: 0.448 x 600 = 268.8
    W(
        "flexure.NEUTRAL_AXIS_IN_WEB",
        {"a_w": 237.264, "beta_1": 0.8825},
        "237.264/0.8825 = 268.85",
        CHECK_5 + "b",
    ),
    W(
        "flexure.M_R_RECTANGULAR",
        {"phi_s": 0.85, "A_s": 2000, "f_y": 400, "d": 535, "a": 107.085},
        "680000*(535 - 107.085/2)/1e6 = 0.68*481.4575 = 327.4",
        CHECK_5 + "a",
    ),
    W(
        "flexure.M_R_TEE",
        {
            "C_f": 1088.5875,
            "d": 600,
            "h_f": 100,
            "phi_s": 0.85,
            "A_s": 7000,
            "f_y": 400,
            "a_w": 237.264,
        },
        "1088.5875*0.55 + (2380 - 1088.5875)*(0.6 - 0.118632)"
        " = 598.7231 + 1291.4125*0.481368 = 1220.4",
        CHECK_5 + "b",
    ),
    W(
        "flexure.YIELD_LIMIT",
        {"f_y": 400},
        "700/(700 + 400) = 7/11 = 0.636",
        "A23.3, 10.5.2: 0.636",
    ),
    W(
        "flexure.YIELD_LIMIT",
        {"f_y": 500},
        "700/(700 + 500) = 7/12 = 0.583",
        "A23.3, 10.5.2: 0.583",
    ),
    W(
        "flexure.M_R_FLANGE_FULL",
        {**BASE, "b": 900, "h_f": 100, "d": 600},
        "18.143125*900*100*(600 - 50)/1e6 = 1632.88125*0.55 = 898.08",
    ),
    # section of check no. 5a, block down to the bars: a = 535, 535 - 535/2 = 267.5 mm arm
    W(
        "flexure.LARGEST_MOMENT",
        {**BASE, "d": 535, "b": 350},
        "18.143125*350*535*267.5/1e6 = 908.8",
        CHECK_5 + "a",
    ),
    # section of check no. 5b, block down to the bars, 600 mm: web 300 wide, arm 300 mm
    W(
        "flexure.LARGEST_MOMENT_TEE",
        {**BASE, "C_f": 1088.5875, "d": 600, "h_f": 100, "b_w": 300},
        "1088.5875*0.55 + 18.143125*300*600*300/1e6 = 1578.5",
        CHECK_5 + "b",
    ),
    W("flexure.BLOCK_LARGEST", {"d": 535}, "535 = 535", CHECK_5 + "a"),
    # back from the resistance of check no. 5a to its block and its 2000 mm2
    W(
        "flexure.BLOCK_REQUIRED",
        {**BASE, "d": 535, "M_f": 327.391, "b": 350},
        "535 - sqrt(535**2 - 2*327391000/(18.143125*350)) = 535 - sqrt(286225 - 103112.7) = 107.1",
        CHECK_5 + "a",
    ),
    W(
        "flexure.A_S_REQUIRED",
        {**BASE, "b": 350, "a_r": 107.085, "phi_s": 0.85, "f_y": 400},
        "18.143125*350*107.085/340 = 2000",
        CHECK_5 + "a",
    ),
    # back from the resistance of check no. 5b: 1220.4 - 1088.6*0.55 to the web, 7000 mm2
    W(
        "flexure.WEB_MOMENT",
        {"M_f": 1220.368, "C_f": 1088.5875, "d": 600, "h_f": 100},
        "1220.368 - 1088.5875*0.55 = 621.64",
        CHECK_5 + "b",
    ),
    W(
        "flexure.BLOCK_REQUIRED_WEB",
        {**BASE, "d": 600, "M_rw": 621.645, "b_w": 300},
        "600 - sqrt(600**2 - 2*621645000/(18.143125*300)) = 600 - sqrt(360000 - 228422.7) = 237.3",
        CHECK_5 + "b",
    ),
    W(
        "flexure.A_S_REQUIRED_WEB",
        {**BASE, "C_f": 1088.5875, "b_w": 300, "a_r": 237.264, "phi_s": 0.85, "f_y": 400},
        "(1088587.5 + 18.143125*300*237.264)/340 = 7000",
        CHECK_5 + "b",
    ),
)
STATE = (
    W(
        "flexure.WEB_FORCE",
        {**BASE, "b_w": 300, "a_w": 200},
        "18.143125*300*200/1e3 = 1088.6",
    ),
    W(
        "flexure.STEEL_STRAIN",
        {"eps_cu": 0.0035, "beta_1": 0.8825, "d": 535, "a": 107.085},
        # c = 107.085/0.8825 = 121.343; 0.0035*(535 - 121.343)/121.343 = 0.011931
        "0.0035*(0.8825*535 - 107.085)/107.085 = 0.0035*365.05/107.085 = 0.011931",
    ),
)
# Doubly reinforced, check no. 5c: b 300, d 500, d' 62, A_s 3000, A'_s 1000, c 145.3 (counted).
DOUBLE = (
    W(
        "compression_steel.STRESS",
        {"f_y": 400, "E_s": 200000, "eps_cu": 0.0035, "c": 145.3, "d_p": 62},
        "min(400, 700*(145.3 - 62)/145.3) = min(400, 401.3) = 400",
        CHECK_5 + "c",
    ),
    W(
        "compression_steel.STRESS",
        {"f_y": 400, "E_s": 200000, "eps_cu": 0.0035, "c": 142.4, "d_p": 62},
        "min(400, 700*(142.4 - 62)/142.4) = min(400, 395.2) = 395.2",
        CHECK_5 + "c",
    ),
    W(
        "compression_steel.FORCE",
        {**BASE, "A_sp": 1000, "phi_s": 0.85, "f_sp": 400},
        "1000*(0.85*400 - 18.143125)/1e3 = 321.86",
    ),
    W(
        "compression_steel.FORCE_GROSS",
        {"A_sp": 1000, "phi_s": 0.85, "f_sp": 395.2},
        "1000*0.85*395.2/1e3 = 335.92",
    ),
    W("compression_steel.BLOCK", {"beta_1": 0.8825, "c": 145.3}, "0.8825*145.3 = 128.23"),
    W(
        "compression_steel.CONCRETE_FORCE",
        {**BASE, "b": 300, "a": 128.26},
        "18.143125*300*128.26/1e3 = 698.1",
    ),
    W(
        "compression_steel.CONCRETE_FORCE_TEE",
        {**BASE, **TEE, "a": 200},
        "18.143125*(60000 + 300*200)/1e3 = 18.143125*120 = 2177.2",
    ),
    W(
        "compression_steel.TENSION",
        {"phi_s": 0.85, "A_s": 3000, "f_y": 400},
        "0.85*3000*0.4 = 1020",
    ),
    W(
        "compression_steel.M_R",
        {"C_c": 698.14, "d": 500, "a": 128.264, "C_s": 321.857, "d_p": 62},
        "698.14*(0.5 - 0.064132) + 321.857*(0.5 - 0.062) = 304.297 + 140.973 = 445.3",
        CHECK_5 + "c",
    ),
    W(
        "compression_steel.M_R_TEE",
        {**BASE, **TEE, "d": 600, "a": 200, "C_s": 321.857, "d_p": 62},
        "18.143125*(60000*550 + 60000*500)/1e6 + 0.321857*538 = 1143.017 + 173.159 = 1316.2",
    ),
)
MINIMUM = (
    W("minimum.WIDTH_WEB", {"b_w": 350}, "350 = 350", CHECK_6),
    W("minimum.WIDTH_FLANGE_T", {"b_f": 2950, "b_w": 350}, "min(2950, 2.5*350) = 875", CHECK_6),
    W("minimum.WIDTH_FLANGE_T", {"b_f": 600, "b_w": 350}, "min(600, 875) = 600"),
    W("minimum.WIDTH_FLANGE_L", {"b_f": 1100, "b_w": 350}, "min(1100, 1.5*350) = 525", CHECK_6),
    W(
        "minimum.A_S_MIN",
        {"f_c": 35, "b_t": 350, "h": 600, "f_y": 400},
        "0.2*sqrt(35)*350*600/400 = 1.183216*525 = 621",
        CHECK_6,
    ),
    W(
        "minimum.A_S_MIN",
        {"f_c": 35, "b_t": 875, "h": 600, "f_y": 400},
        "0.2*sqrt(35)*875*600/400 = 1553",
        CHECK_6,
    ),
    W(
        "minimum.A_S_MIN",
        {"f_c": 35, "b_t": 525, "h": 600, "f_y": 400},
        "0.2*sqrt(35)*525*600/400 = 932",
        CHECK_6,
    ),
    W(
        "minimum.A_S_MIN",
        {"f_c": 40, "b_t": 400, "h": 600, "f_y": 400},
        "0.2*sqrt(40)*400*600/400 = 759",
        HANDBOOK_A2,
    ),
    W("minimum.SPREAD_WIDTH", {"b_o": 1360, "l": 7.6}, "min(1360, 7600/20) = 380"),
    W("minimum.SPREAD_AREA", {"b_ot": 380, "h_f": 140}, "0.004*380*140 = 212.8"),
)
CRACKS = (
    W(
        "crack_control.STRESS",
        {"n_E": 8, "M_s": 120, "d": 540, "kd": 140, "I_cr": 1.6e9},
        "8*120e6*400/1.6e9 = 240",
    ),
    W("crack_control.STRESS_ALLOWANCE", {"f_y": 400}, "0.6*400 = 240", CHECK_7),
    W(
        "crack_control.D_C",
        {"c_c": 40, "d_bs": 11.3, "d_b": 25.2},
        "40 + 11.3 + 12.6 = 63.9",
        CHECK_7,
    ),
    W("crack_control.D_S", {"h": 600, "d": 536.1}, "600 - 536.1 = 63.9", CHECK_7),
    W("crack_control.BAR_COUNT", {"A_s": 2000, "A_b": 500}, "2000/500 = 4", CHECK_7),
    W(
        "crack_control.TENSION_AREA_T",
        {"d_s": 51, "b_w": 380, "b_ot": 380, "n_z": 10},
        "2*51*(380 + 760)/10 = 11628",
    ),
    W(
        "crack_control.TENSION_AREA_L",
        {"d_s": 51, "b_w": 380, "b_ot": 380, "n_z": 8},
        "2*51*(380 + 380)/8 = 9690",
    ),
    W(
        "crack_control.TENSION_AREA",
        {"d_s": 63.9, "b_w": 350, "n_z": 4},
        "2*63.9*350/4 = 11182.5",
        CHECK_7,
    ),
    W(
        "crack_control.Z",
        {"f_s": 240, "d_c": 63.9, "A_e": 11182.5},
        "240*(63.9*11182.5)**(1/3) = 240*714561.75**(1/3) = 21456",
        CHECK_7,
    ),
    # f_s 1.2 times as large a z: 1.2 z <= 25 000 is z <= 20 833
    W("crack_control.COATED_LIMIT", {"z_mu": 25000}, "25000/1.2 = 20833"),
    W(
        "crack_control.SKIN_HEIGHT",
        {"h": 900, "d": 815},
        "max(0.5*900 - 2*85, 0) = max(280, 0) = 280",
        CHECK_14,
    ),
    # bars high up: twice their distance of 200 mm is more than half the depth
    W("crack_control.SKIN_HEIGHT", {"h": 760, "d": 560}, "max(0.5*760 - 2*200, 0) = 0"),
    W(
        "crack_control.SKIN_DEPTH",
        {"c_c": 40, "d_bs": 11.3, "d_b": 16},
        "40 + 11.3 + 8 = 59.3",
        CHECK_14,
    ),
    W(
        "crack_control.SKIN_WIDTH",
        {"d_sk": 59.3, "b_w": 350},
        "min(2*59.3, 350/2) = 118.6",
        CHECK_14,
    ),
    W("crack_control.SKIN_WIDTH", {"d_sk": 59.3, "b_w": 200}, "min(118.6, 200/2) = 100"),
    W("crack_control.SKIN_STRIPS", {"h_sk": 280, "b_sk": 118.6}, "2*280*118.6 = 66416", CHECK_14),
    W("crack_control.SKIN_AREA", {"rho_sk": 0.008, "A_cs": 66416}, "0.008*66416 = 531", CHECK_14),
    W("crack_control.SKIN_SPACING", {"h_sk": 280, "n_k": 3}, "280/3 = 93.3"),
)
CAPACITY = (
    W("capacity.QUARTER", {"A_sb": 9600}, "0.25*9600 = 2400"),
    W("capacity.HALF", {"A_sb": 9600}, "0.5*9600 = 4800"),
    W("capacity.THREE_QUARTERS", {"A_sb": 9600}, "0.75*9600 = 7200"),
    W("capacity.WHOLE", {"A_sb": 9600}, "1.0*9600 = 9600"),
    W("capacity.RATIO", {"A_s": 3000, "A_sb": 9600}, "3000/9600 = 0.3125"),
)
WORKED_FLEXURE = (*FLEXURE, *STATE, *DOUBLE, *MINIMUM, *CRACKS, *CAPACITY)
