"""Demo calcs with one line of loads, deflections, cracks or bars that fell into a trap."""

from __future__ import annotations

from lineproof.record import Record

from .altered import Data, changed, demo, edited
from .trap_cases import (
    EDGE,
    EXISTING,
    Case,
    codes,
    line,
    lines,
    project,
    said_in_note,
    whole,
)

_CASES = "analysis/cases"


def _all_spans_only(data: Data) -> None:
    part = next(part for part in data["parts"] if part["key"] == "analysis")
    note = next(entry for entry in part["entries"] if entry["symbol"] == "cases")
    note["text"] = (
        "3 load cases. Combinations: 1.4D; 1.25D + 1.5L; 0.9D + 1.5L. Placements, with every "
        "combination of live load: live load on spans 1, 2, 3."
    )


def _given_load(data: Data) -> None:
    part = next(part for part in data["parts"] if part["key"] == "loads")
    like = next(entry for entry in part["entries"] if entry["symbol"] == "q_SD")
    part["entries"].append(
        like | {"id": "loads/P_x1", "symbol": "P_x1", "unit": "kN", "value": 40.0, "label": "3.99"}
    )


def _strength_twice(data: Data) -> None:
    part = next(part for part in data["parts"] if part["key"] == "service")
    like = next(e for p in data["parts"] for e in p["entries"] if e["id"] == "given/f_c")
    part["entries"].append(like | {"id": "service/f_c", "value": 30.0, "label": "39.9"})


def _low_importance() -> Record:
    """Return a calc whose superimposed load is named snow, in a building of low importance."""
    record = changed(demo("floor-beam"), "loads/q_SD", symbol="q_S")
    return edited(record, project(building={"importance": "low"}))


LOADS = (
    line(15, "a companion load has the factor of an older edition", "sag-1/w_f",
         formula="w_f = 1.25*w_D1 + 1.5*w_L1 + 0.5*w_S1", args={"w_S1": "loads/w_L2"}),
    line(15, "a companion load has the factor of an older edition", "sag-1/w_f",
         formula="w_f = 1.25*w_D1 + 1.5*w_S1 + 0.5*w_L1", args={"w_S1": "loads/w_L2"}),
    line(15, "1.2D + 1.6L is the combination of another standard", "sag-1/w_f",
         formula="w_f = 1.2*w_D1 + 1.6*w_L1"),
    line(15, "a stored load as companion of snow has the factor of other uses", "sag-1/w_f",
         EXISTING, formula="w_f = 1.25*w_D1 + 1.5*w_S1 + 1.0*w_Lst1",
         args={"w_S1": "loads/w_Lst2"}),
    whole(15, "The load combination 1.4D is not among", said_in_note(_CASES, "1.4D; ", "")),
    whole(15, "The load combination 0.9D + 1.5L is not among",
          said_in_note(_CASES, "; 0.9D + 1.5L", "")),
    whole(15, "The load combination 1.25D + 1.5S is not among",
          said_in_note(_CASES, "1.4D;", "1.4D; 1.25D + 1.5S + 1.0L; 0.9D + 1.5S + 1.0L;")),
    lines(16, "the live load is reduced twice", "loads/w_L",
          ("loads/q_SD", {"symbol": "r_L"}),
          ("loads/q_L", {"kind": "line", "formula": "q_L = r_L*h_f", "title": "Live load",
                         "args": {"r_L": "loads/q_SD", "h_f": "given/h_f"}}),
          ("loads/w_L", {"formula": "w_L = r_L*q_L*b_tr", "args": {"r_L": "loads/q_SD"}})),
    Case(16, "it serves deflections too, where the factor is 0.9", _low_importance, "loads/q_SD"),
    whole(17, "Live load stands on all spans only", _all_spans_only),
    line(27, "the part of the beam within the slab is counted twice", "loads/w_D1",
         formula="w_D1 = w_sl + w_bm + w_SD", args={"w_bm": "loads/w_wb"}),
    line(27, "no self weight is in it", "loads/w_D1", formula="w_D1 = w_SD",
         args={"w_sl": "loads/w_SD", "w_wb": "loads/w_SD"}),
    line(27, "partitions are counted as live load", "loads/w_L",
         formula="w_L = (q_L + q_pt)*b_tr", args={"q_pt": "loads/q_SD"}),
    line(27, "w l²/8 is the moment of a simple span", "sag-1/M_f", formula="M_f = w_f*l**2/8",
         args={"l": "given/l_1"}),
)  # fmt: skip

WHOLE = (
    whole(29, "are no pair that goes together", codes(building="NBC 2020")),
    line(29, "rests on A23.3-19, the calc on NBC 2015 + A23.3-14", "given/c_c",
         source="A23.3:19, table of covers"),
    line(29, "rests on NBC 2020, the calc on", "loads/q_SD", title="finishes, NBC 2020"),
    whole(13, "the limit of A23.3-14 is used, which later editions changed",
          codes(pair="NBC 2020 + A23.3:19", building="NBC 2020", concrete="CSA A23.3:19")),
    line(30, "is half of what this beam carries", "given/b_tr", value=1.55),
    line(30, "is that of a beam with slab on both sides", "given/b_tr", EDGE, value=6.2),
    line(30, "specified loads stand for factored ones", "sag-1/w_f",
         formula="w_f = 1.0*w_D1 + 1.0*w_L1"),
    line(30, "factored loads stand for specified ones", "deflection-1-all/w_s",
         formula="w_s = 1.25*w_D1 + 1.5*w_L1"),
    line(30, "the stress is that of factored loads", "sag-1/f_s",
         formula="f_s = f_y*M_f/M_r", args={"M_f": "sag-1/M_f", "M_r": "sag-1/M_r"}),
    line(30, "the width of support 1 stands for that of support 2", "span-2/l_n",
         args={"b_sl": "given/b_s1"}),
    line(30, "the width of support 1 stands for that of support 2", "shear-2-left/x_f",
         args={"b_sn": "given/b_s1"}),
    line(30, "the moment at the axis stands for that at the face", "hog-2-left/M_f",
         args={"x_f": "sag-1/V_f"}),
    whole(31, "The strength of the concrete stands with 2 values: 30 MPa, 32 MPa", _strength_twice),
    whole(31, "is given, but nothing rests on it", _given_load),
    line(31, "the limit is that of: floor, nothing attached", "deflection-1/k_D",
         row="floor, nothing attached that deflection damages"),
    whole(32, "The project tells places of B12, not of B7",
          project(locations=[{"calc": "B12", "grid": "A"}])),
    whole(32, "The issue is dated 2025-05-01, before its last revision of 2026-12-01",
          project(issue={"date": "2025-05-01"})),
    whole(32, "A. Reed prepared and checked the calc",
          project(issue={"prepared_by": "A. Reed", "checked_by": "A. Reed"})),
)  # fmt: skip

SERVICE = (
    line(18, "the modulus of rupture is not halved", "deflection-1-sections/f_rd",
         formula="f_rd = f_r", value=3.394),
    line(18, "the cracking moment is that of the full modulus", "deflection-1-sections/M_crd",
         args={"f_rd": "materials/f_r"}),
    line(18, "the cracking moment is that of the full modulus", "deflection-1-all/I_em",
         args={"M_crd": "span-1/M_cr"}),
    lines(18, "the halved cracking moment of deflections stands for M_cr", "sag-1/minimum-steel",
          ("sag-1/minimum-steel", {"formula": "1.2*M_cr <= M_r", "args": {
              "M_cr": "deflection-1-sections/M_crd", "M_r": "sag-1/M_r"}})),
    line(19, "gives the additional deflection, not the total", "deflection-1/zeta_s",
         formula="zeta_s = S_t", value=2.0),
    line(19, "the immediate deflection is counted twice", "deflection-1/delta_t",
         formula="delta_t = delta_DL + zeta_s*delta_sus",
         args={"delta_DL": "deflection-1-all/delta_DL"}),
    line(19, "the immediate deflection is in part dropped", "deflection-1/delta_t",
         formula="delta_t = zeta_s*delta_sus"),
    lines(19, "the width of the web is taken at midspan", "sag-1/n_z",
          ("sag-1/n_z", {"formula": "rho_p = A_s/(b_w*d)",
                         "args": {"b_w": "given/b_w", "d": "sag-1/d"}})),
    line(20, "is not the distance to the centre of the bar", "sag-1/d_c",
         formula="d_c = c_c + d_bs", value=41.3),
    line(20, "is not the distance to the centre of the bar: the stirrup is forgotten", "sag-1/d_c",
         formula="d_c = c_c + d_b/2", value=39.75),
    line(20, "the concrete is not divided by the number of bars", "sag-1/A_e",
         formula="A_e = 2*d_s*b_w", value=38798.0),
    line(20, "0.6 f_y is what may be taken for the stress", "sag-1/crack-control",
         formula="f_s <= 0.6*f_y", args={"f_s": "sag-1/f_s", "f_y": "materials/f_y"}),
    line(21, "the distance that governs splitting stands where another", "sag-1/z",
         args={"d_c": "anchorage-bar-1/d_cs"}),
    line(21, "the cover of the stirrup stands where another distance", "cover/cover-fire",
         args={"c_b1": "given/c_c"}),
    line(21, "the cover of the bars stands where another distance", "cover/cover-stirrup",
         args={"c_c": "cover/c_b1"}),
    line(21, "the distance to the nearest bar, for cracks stands where", "anchorage-bar-1/l_d0g",
         args={"d_cs": "sag-1/d_c"}),
)  # fmt: skip

LAID = (
    line(22, "the factor of a bar of 19.5 mm is 0.8", "anchorage-bar-1/k_4", value=1.0),
    lines(22, "the factor of a bar of 25.2 mm is 1", "anchorage-bar-1/k_4",
          ("anchorage-bar-1/d_b", {"value": 25.2})),
    line(22, "the factor 1.3 of top bars is forgotten", "anchorage-bar-4/k_1", value=1.0),
    line(22, "bottom bars have the factor of top bars", "anchorage-bar-1/k_1", value=1.3),
    lines(22, "0.45 is used without the cover, spacing or stirrups", "anchorage-bar-1/l_d0",
          ("anchorage-bar-1/development-spacing", {"holds": False})),
    line(23, "the reduction for more steel than required is used in a lap", "anchorage-bar-1/l_s",
         formula="l_s = max(1.3*l_d0*A_sr/A_s, 300)",
         args={"A_sr": "sag-1/A_sr", "A_s": "sag-1/A_s"}),
    line(23, "a class A lap stands where class B belongs", "anchorage-bar-1/l_s",
         formula="l_s = max(1.0*l_d0, 300)", value=496.4),
    line(23, "is shorter than 300 mm", "anchorage-bar-1/l_s", value=280.0),
    line(31, "the bars are told as 5-20M, which have 1500 mm²", "sag-1/A_s", value=1200.0),
    line(31, "the bars are told as 2-20M, 1-20M in each overhang", "hog-1-right/A_s", value=900.0),
    line(31, "the stirrups of this zone stand at 350 mm", "shear-2-left/s", value=200.0),
)  # fmt: skip
