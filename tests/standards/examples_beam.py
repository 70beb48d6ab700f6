"""Examples of the criteria of shear, torsion, service, anchorage: one holds, one does not."""

from __future__ import annotations

from .examples import Given

C: Given = {"phi_c": 0.65, "f_c": 35, "lambda_": 1, "b_w": 350, "d_v": 481.5}
S: Given = {"phi_s": 0.85, "f_y": 400}
STIFF: Given = {"l": 8, "E_c": 25000, "I_crm": 3e9, "I_gw": 5e9}

EXAMPLES_BEAM: dict[str, tuple[Given, Given]] = {
    "reduction.LARGE_ENOUGH": ({"A_L": 81, "A_Lmin": 80}, {"A_L": 20, "A_Lmin": 20}),
    "analysis.CHANGE_ALLOWED": ({"p_rd": -18, "p_max": 18.2}, {"p_rd": 18.3, "p_max": 18.2}),
    # 1.2*7.6 = 9.12
    "analysis.LIKE_SPANS": ({"l_n1": 9.1, "l_n2": 7.6}, {"l_n1": 9.2, "l_n2": 7.6}),
    "analysis.LIKE_LOADS": ({"w_Lf": 30, "w_Df": 15}, {"w_Lf": 30.1, "w_Df": 15}),
    # 0.3*0.65*sqrt(35)*350*481.5 = 0.195*5.91608*168.525 = 194.4 kN
    "shear.NEAR_POINT_LOADS": ({**C, "V_pl": 194}, {**C, "V_pl": 195}),
    "shear.STRENGTH": ({"V_f": 260, "V_r": 324.5}, {"V_f": 325, "V_r": 324.5}),
    "shear.RESTRAINT_STRENGTH": ({"V_fr": 324, "V_r": 324.5}, {"V_fr": 325, "V_r": 324.5}),
    "shear.WEB_HOLDS": ({"V_f": 958, "V_rmax": 958.5}, {"V_f": 959, "V_rmax": 958.5}),
    "shear.NEEDS_STIRRUPS": ({"V_f": 117, "V_c": 116.6}, {"V_f": 116.6, "V_c": 116.6}),
    "shear.DEPTH_NEEDS_STIRRUPS": ({"h": 751}, {"h": 750}),
    "shear.HAS_MINIMUM": ({"A_vmin": 69.9, "A_v": 200}, {"A_vmin": 201, "A_v": 200}),
    # check no. 8: 0.125*0.65*35*350*481.5 = 479.2 kN
    "shear.CLOSER": ({**C, "V_f": 479.3}, {**C, "V_f": 479.2}),
    "shear.SPACING": ({"s": 168, "s_max": 168.5}, {"s": 225, "s_max": 168.5}),
    "shear_factors.GRADE_FOR_SIMPLIFIED": ({"f_y": 400}, {"f_y": 500}),
    "shear_factors.CONCRETE_FOR_SIMPLIFIED": ({"f_c": 60}, {"f_c": 65}),
    "shear_factors.SHALLOW": ({"h": 250}, {"h": 251}),
    # half the web of 350: 175; half the web of 900 counts as 350
    "shear_factors.SHALLOW_BELOW_SLAB": (
        {"h": 300, "h_f": 130, "b_w": 350},
        {"h": 500, "h_f": 140, "b_w": 900},
    ),
    # 0.003*350*200 = 210 mm2
    "shear_factors.LAYER_COUNTS": (
        {"b_w": 350, "s_z": 200, "A_ly": 210},
        {"b_w": 350, "s_z": 200, "A_ly": 200},
    ),
    "shear_factors.STRAIN_IN_RANGE": ({"eps_x": 0.003}, {"eps_x": 0.0031}),
    "shear_factors.BARS_IN_RANGE": ({"A_sx": 493.6, "A_s": 500}, {"A_sx": 493.6, "A_s": 0}),
    "shear.DEPTH_WITHOUT_STIRRUPS": ({"h": 750}, {"h": 751}),
    "shear.CLEAR_SPACE": ({"s": 100, "d_bs": 11.3}, {"s": 75, "d_bs": 11.3}),
    "shear_bars.HOOKS_SUFFICE": ({"d_bs": 16}, {"d_bs": 19.5}),
    "shear_bars.CORNERS_HELD": ({"n_cb": 2}, {"n_cb": 1}),
    # 0.85*1633*400 = 555.2 kN; 0.85*656*400 = 223.0 kN
    "shear_bars.TENSION_SIDE_HOLDS": (
        {**S, "F_lt": 555.2, "A_sd": 1633},
        {**S, "F_lt": 555.2, "A_sd": 1632},
    ),
    "shear_bars.CAPPED_HOLDS": (
        {**S, "F_ltc": 510, "A_sd": 1500},
        {**S, "F_ltc": 510, "A_sd": 1499},
    ),
    "shear_bars.COMPRESSION_SIDE_HOLDS": (
        {**S, "F_lc": 119, "A_sp": 400},
        {**S, "F_lc": 119, "A_sp": 300},
    ),
    "shear_bars.END_SUPPORT_HOLDS": (
        {**S, "F_le": 222.9, "A_sd": 656},
        {**S, "F_le": 222.9, "A_sd": 655},
    ),
    "shear_bars.HANGERS_PROVIDED": ({"A_hr": 600, "A_h": 600}, {"A_hr": 601, "A_h": 600}),
    # check no. 10: 0.25*33.92 = 8.48
    "torsion.COUNTS": ({"T_f": 8.49, "T_cr": 33.92}, {"T_f": 8.48, "T_cr": 33.92}),
    "torsion.STRENGTH": ({"T_f": 28, "T_r": 48.28}, {"T_f": 49, "T_r": 48.28}),
    # 200/175 = 1.143; 200/225 = 0.889
    "torsion.LEGS_PROVIDED": (
        {"a_vt": 1.1285, "A_v": 200, "s": 175},
        {"a_vt": 1.1285, "A_v": 200, "s": 225},
    ),
    # check no. 10: 2.124 MPa; at 7 times both loads 14.9 MPa; limit 5.688 MPa
    "torsion.SECTION": (
        {**C, "V_f": 260, "T_f": 28, "p_h": 1534.8, "A_oh": 131601},
        {**C, "V_f": 1820, "T_f": 196, "p_h": 1534.8, "A_oh": 131601},
    ),
    # 225/16 = 14.1 mm
    "torsion.CORNER_BARS": ({"s": 225, "d_b": 16}, {"s": 225, "d_b": 11.3}),
    "interface.STRENGTH": ({"v_f": 1.15, "v_r": 2.89}, {"v_f": 2.9, "v_r": 2.89}),
    "bearing.STRENGTH": ({"R_f": 1300, "B_r": 1353.6}, {"R_f": 1354, "B_r": 1353.6}),
    "deflection.DEEP_ENOUGH": ({"h_min": 450, "h": 600}, {"h_min": 601, "h": 600}),
    "deflection.AXIS_IN_FLANGE": ({"kd": 90, "h_f": 100}, {"kd": 101, "h_f": 100}),
    "deflection.LIVE_SMALL": (
        {"delta_L": 20, "delta_max": 20},
        {"delta_L": 20.1, "delta_max": 20},
    ),
    "deflection.ATTACHED_SMALL": (
        {"delta_at": 12.9, "delta_max": 15},
        {"delta_at": 15.1, "delta_max": 15},
    ),
    "deflection_stages.UNCRACKED": ({"M_a": 37, "M_crd": 37.3}, {"M_a": 38, "M_crd": 37.3}),
    "deflection_stages.UNCRACKED_TOP": ({"M_a": 37, "M_crdn": 37.3}, {"M_a": 38, "M_crdn": 37.3}),
    "deflection_stages.WHOLE": ({"M_a": 37, "M_crd": 37.3}, {"M_a": 38, "M_crd": 37.3}),
    "deflection_stages.WHOLE_TOP": ({"M_a": 37, "M_crdn": 37.3}, {"M_a": 38, "M_crdn": 37.3}),
    "deflection_stages.RISE_SMALL": (
        {"delta_up": 4.9, "delta_max": 5},
        {"delta_up": 5.1, "delta_max": 5},
    ),
    # 8000^2*100e6/(4*25000*2e9) = 32 mm
    "deflection_stages.BOUND_SIMPLE": (
        {"delta_k": 31, "l": 8, "M_m": 100, "E_c": 25000, "I_crm": 2e9, "I_g": 5e9},
        {"delta_k": 33, "l": 8, "M_m": 100, "E_c": 25000, "I_crm": 2e9, "I_g": 5e9},
    ),
    # 8000^2*(60 + 40)e6/(4*25000*2e9) = 32 mm
    "deflection_stages.BOUND_ONE_END": (
        {"delta_k": 31, "M_m": 60, "M_h": 40, "I_cre": 2e9, **STIFF},
        {"delta_k": 33, "M_m": 60, "M_h": 40, "I_cre": 2e9, **STIFF},
    ),
    "deflection_stages.BOUND_BOTH_ENDS": (
        {"delta_k": 31, "M_m": 40, "M_h1": 40, "M_h2": 20, "I_cr1": 2e9, "I_cr2": 4e9, **STIFF},
        {"delta_k": 33, "M_m": 40, "M_h1": 40, "M_h2": 20, "I_cr1": 2e9, "I_cr2": 4e9, **STIFF},
    ),
    "development.TOP_BAR": ({"h_u": 301}, {"h_u": 300}),
    # 3 x 19.5 = 58.5 mm, 6 x 19.5 = 117 mm
    "development.COATED_COVERED": ({"d_b": 19.5, "c_b1": 58.5}, {"d_b": 19.5, "c_b1": 58.4}),
    "development.COATED_SPACED": ({"d_b": 19.5, "s_c": 117}, {"d_b": 19.5, "s_c": 116.9}),
    "development.COVERED": ({"d_b": 25.2, "c_b1": 51.3}, {"d_b": 25.2, "c_b1": 20}),
    # 1.4*25.2 = 35.28; 2*16 = 32
    "development.SPACED": ({"d_b": 25.2, "s_c": 48.9}, {"d_b": 25.2, "s_c": 35}),
    "development.SPACED_SLAB": ({"d_b": 16, "s_c": 32}, {"d_b": 16, "s_c": 31}),
    "development.DEVELOPED": ({"l_d": 672, "l_av": 700}, {"l_d": 672, "l_av": 671}),
    "development.IN_PART": ({"l_d": 672, "l_av": 671}, {"l_d": 672, "l_av": 672}),
    "development.DEVELOPED_COMPRESSION": (
        {"l_dc": 444, "l_av": 444},
        {"l_dc": 444, "l_av": 400},
    ),
    "hooks.SIDE_COVERED": ({"c_side": 60}, {"c_side": 51}),
    "hooks.FACE_COVERED": ({"c_top": 60}, {"c_top": 51.3}),
    "hooks.TAIL_COVERED": ({"c_tail": 50}, {"c_tail": 49}),
    # 3*25.2 = 75.6
    "hooks.TIED": ({"s_tie": 75, "d_b": 25.2}, {"s_tie": 76, "d_b": 25.2}),
    # 11.3 + max(1.4 x 11.3, 1.4 x 20, 30) = 41.3
    "hooks.TIES_CLEAR": (
        {"a_max": 20, "s_tie": 55, "d_bs": 11.3},
        {"a_max": 20, "s_tie": 41, "d_bs": 11.3},
    ),
    # 8 diameters of a bar 25M are 201.6 mm, of a bar 15M 128 mm, less than 150
    "hooks.FITS": ({"l_av": 202, "d_b": 25.2}, {"l_av": 149, "d_b": 16}),
    "hooks.IN_PART": ({"l_dh": 426, "l_av": 340}, {"l_dh": 298, "l_av": 298}),
    "laps.LAPPABLE": ({"d_b": 35.7}, {"d_b": 43.7}),
    "laps.EXCESS_FOR_A": ({"A_sr": 1000, "A_s": 2000}, {"A_sr": 1001, "A_s": 2000}),
    "laps.SHARE_FOR_A": ({"r_sp": 0.5}, {"r_sp": 1}),
    # 600/5 = 120; 1000/5 = 200 counts as 150
    "laps.LONG_ENOUGH": ({"l_s": 874, "l_lp": 900}, {"l_s": 874, "l_lp": 850}),
    "laps.ROOM": ({"s_min": 35.3, "s_cl": 48.9}, {"s_min": 35.3, "s_cl": 24}),
    "laps.CLOSE": ({"s_nc": 120, "l_s": 600}, {"s_nc": 151, "l_s": 1000}),
    # 2/3*324.5 = 216.3; 0.75*324.5 = 243.4
    "cutoff.EXTENDED": ({"l_e": 687.7, "l_ext": 700}, {"l_e": 687.7, "l_ext": 650}),
    "cutoff.CONTINUES": ({"l_co": 1302, "l_cn": 1400}, {"l_co": 1302, "l_cn": 1300}),
    "cutoff.SUFFICES": ({"M_f": 172, "M_r": 172.8}, {"M_f": 173, "M_r": 172.8}),
    "cutoff.CUT_AT_LOW_SHEAR": ({"V_f": 216, "V_r": 324.5}, {"V_f": 217, "V_r": 324.5}),
    "cutoff.CUT_AT_DOUBLE_AREA": ({"A_sr": 500, "A_co": 1000}, {"A_sr": 501, "A_co": 1000}),
    "cutoff.CUT_AT_MODERATE_SHEAR": ({"V_f": 243, "V_r": 324.5}, {"V_f": 244, "V_r": 324.5}),
    "cutoff.CUT_OF_THIN_BARS": ({"d_b": 35.7}, {"d_b": 43.7}),  # 35M; 45M
    # 2000/3 = 667; 2000/4 = 500
    "cutoff.INTO_SIMPLE_SUPPORT": ({"A_s": 2000, "A_se": 1000}, {"A_s": 2000, "A_se": 600}),
    "cutoff.INTO_CONTINUOUS_SUPPORT": ({"A_s": 2000, "A_se": 500}, {"A_s": 2000, "A_se": 499}),
    "cutoff.LENGTH_IN_SUPPORT": ({"l_in": 150}, {"l_in": 149}),
    "cutoff.ANCHORED_LATERAL": ({"l_d": 672, "l_in": 680}, {"l_d": 672, "l_in": 600}),
    # check no. 12c: 815 without, 1014 with confinement
    "cutoff.DEVELOPED_AT_ZERO_MOMENT": ({"l_d": 767, "l_lim": 815}, {"l_d": 997, "l_lim": 815}),
    "cutoff.TOP_PAST_INFLECTION": ({"A_s": 1500, "A_pi": 500}, {"A_s": 1500, "A_pi": 499}),
    # 6800/4 = 1700
    "cutoff.RESTRAINED_END": ({"l_n": 6.8, "l_ext": 1700}, {"l_n": 6.8, "l_ext": 1650}),
    "cutoff.LONG_PAST_INFLECTION": ({"l_pi": 600, "l_ext": 600}, {"l_pi": 600, "l_ext": 599}),
}
