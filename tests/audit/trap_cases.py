"""Demo calcs with one line that fell into a trap: what was changed, and what must be found."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from typing import Any

from lineproof.record import Record

from .altered import Data, changed, demo, edited

FLOOR, EDGE, EXISTING = "floor-beam", "edge-beam", "existing-beam"


@dataclass(frozen=True)
class Case:
    """A record, the line at fault, and a piece of the sentence that must name it."""

    number: int
    said: str
    record: Callable[[], Record]
    entry_id: str = ""


def line(number: int, said: str, entry_id: str, name: str = FLOOR, **fields: Any) -> Case:
    """Return the case of a demo calc in which fields of one line were changed."""
    return Case(number, said, lambda: changed(demo(name), entry_id, **fields), entry_id)


def lines(
    number: int, said: str, entry_id: str, *edits: tuple[str, dict[str, Any]], name: str = FLOOR
) -> Case:
    """Return the case of a demo calc in which several lines were changed."""

    def record() -> Record:
        made = demo(name)
        for changed_id, fields in edits:
            made = changed(made, changed_id, **dict(fields))
        return made

    return Case(number, said, record, entry_id)


def whole(number: int, said: str, edit: Callable[[Data], None], name: str = FLOOR) -> Case:
    """Return the case of a demo calc whose data were changed in some other way."""
    return Case(number, said, lambda: edited(demo(name), edit))


def _entry(data: Data, entry_id: str) -> Data:
    found: Data = next(e for p in data["parts"] for e in p["entries"] if e["id"] == entry_id)
    return found


def said_in_note(entry_id: str, old: str, new: str) -> Callable[[Data], None]:
    """Return an edit of a note's text."""

    def edit(data: Data) -> None:
        note = _entry(data, entry_id)
        assert old in note["text"]
        note["text"] = note["text"].replace(old, new)

    return edit


def open_stirrups(data: Data) -> None:
    """Draw the stirrups of the first zone open in the schedule."""
    table = _entry(data, "schedule/stirrup-schedule")
    form = table["columns"].index("Form")
    table["rows"] = [[*row] for row in table["rows"]]
    table["rows"][1][form] = "open"


def without(pattern: str) -> Callable[[Data], None]:
    """Return an edit that takes away all entries whose symbol is this."""

    def edit(data: Data) -> None:
        for part in data["parts"]:
            part["entries"] = [e for e in part["entries"] if e["symbol"] != pattern]

    return edit


def project(**tables: Any) -> Callable[[Data], None]:
    """Return an edit of the project's facts."""

    def edit(data: Data) -> None:
        data["project"] = data["project"] | tables

    return edit


def codes(**names: str) -> Callable[[Data], None]:
    """Return an edit of the names of the codes; nothing is left to be confirmed."""

    def edit(data: Data) -> None:
        data["codes"] = data["codes"] | names
        data["confirm"] = []

    return edit


SECTION = (
    line(1, "the width of the flange is used in negative moment", "hog-2-left/a",
         args={"b": "span-2/b_f"}),
    line(1, "the width of the flange is used in negative moment", "hog-3-right/a_r",
         args={"b": "span-2/b_f"}),
    line(1, "the cracked section at midspan is taken without its flange",
         "deflection-1-sections/I_crm", args={"b": "given/b_w"}),
    line(1, "the gross section at midspan is taken without its flange", "deflection-1-all/I_em",
         args={"I_g": "deflection-1-sections/I_gw"}),
    line(2, "the effective depth stands for the overall depth", "sag-1/A_smin",
         formula="A_smin = 0.2*sqrt(f_c)*b_t*d/f_y", args={"d": "sag-1/d"}),
    line(2, "coefficients 0.25 or 1.4 are not those", "sag-1/A_smin",
         formula="A_smin = 0.25*sqrt(f_c)*b_t*h/f_y"),
    line(2, "the flange in tension is left out of the width", "hog-2-left/A_smin",
         formula="A_smin = 0.2*sqrt(f_c)*b_w*h/f_y", args={"b_w": "given/b_w"}),
    line(2, "is not the width of the zone in tension here", "hog-2-left/b_t",
         formula="b_t = b_w", value=380.0),
    line(2, "is not the width of the zone in tension here", "hog-2-right/b_t", EDGE,
         formula="b_t = min(b_f, 2.5*b_w)", value=950.0),
    line(3, "0.2 l stands where 0.1 l belongs", "span-2/b_o",
         formula="b_o = min(l/5, 12*h_f, l_w/2)"),
    line(3, "12 h_f stands where 6 h_f belongs", "span-2/b_o", EDGE,
         formula="b_o = min(l/12, 12*h_f, l_w/2)"),
    line(3, "the limit by l_w is left out", "span-2/b_o", formula="b_o = min(l/10, 12*h_f)"),
    line(3, "the overhang is not counted 2 times", "span-2/b_f", formula="b_f = b_w + b_o",
         value=1300.0),
    line(12, "the resistance factors are applied twice", "sag-1/M_r",
         formula="M_r = phi_s*phi_s*A_s*f_y*(d - a/2)"),
    line(12, "no resistance factor stands in it: a nominal resistance", "sag-1/M_r",
         formula="M_r = A_s*f_y*(d - a/2)"),
    line(12, "a factor of the member stands beside", "sag-1/M_r",
         formula="M_r = 0.9*phi_s*A_s*f_y*(d - a/2)"),
    line(13, "the limit of c/d is not that of this steel", "sag-1/c_d", value=700 / 1200),
    lines(13, "the limit of c/d is not that of this steel", "sag-1/c_d",
          ("materials/f_y", {"value": 500.0})),
    line(24, "the least clear distance is too small", "sag-1/s_min",
         formula="s_min = max(d_b, 25)", value=25.0),
)  # fmt: skip

SHEAR = (
    line(4, "the effective depth d stands where d_v belongs", "shear-2-left/V_c",
         formula="V_c = phi_c*lambda_*beta*min(1.0*sqrt(f_c), 8)*b_w*d", args={"d": "sag-2/d"}),
    line(4, "the effective depth d stands where d_v belongs", "shear-2-left/V_s",
         args={"d_v": "sag-2/d"}),
    line(4, "the effective depth d stands where d_v belongs", "shear-2-left/x_f",
         formula="x_f = b_sn/2 + d", args={"d": "sag-2/d"}),
    line(4, "is not the larger of 0.9 d and 0.72 h", "shear-2-left/d_v",
         formula="d_v = 0.72*h", value=446.4),
    line(5, "crushing of the web goes with f'c, not with its root", "shear-2-left/V_rmax",
         formula="V_rmax = 0.25*phi_c*sqrt(f_c)*b_w*d_v"),
    line(5, "the root of f'c is forgotten", "shear-2-left/V_c",
         formula="V_c = phi_c*lambda_*beta*f_c*b_w*d_v"),
    lines(5, "the root of f'c is not held at 8 MPa", "shear-2-left/V_c",
          ("given/f_c", {"value": 81.0}),
          ("shear-2-left/V_c", {"formula": "V_c = phi_c*lambda_*beta*sqrt(f_c)*b_w*d_v"})),
    line(5, "the limit that halves the spacing is not", "shear-2-left/shear-halves-spacing",
         formula="V_f > 0.125*lambda_*phi_c*sqrt(f_c)*b_w*d_v"),
    line(5, "the limit that halves the spacing is not", "shear-2-left/shear-halves-spacing",
         formula="V_f > 0.125*phi_c*f_c*b_w*d_v"),
    line(6, "an angle in degrees is turned into radians", "shear-2-left/V_s",
         formula="V_s = phi_s*A_v*f_y*d_v*cot(theta*3.14159/180)/s"),
    line(6, "a strain of this size looks like thousandths", "shear-2-left/eps_x", value=0.85),
    line(6, "a factor of units stands between moment and shear", "shear-2-left/eps_x",
         formula="eps_x = (1000*M_f/d_v + V_f)/(2*E_s*A_s)"),
    lines(7, "is used without the minimum of stirrups", "shear-2-left/V_c",
          ("shear-2-left/V_c", {"args": {"beta": "shear-2-left/beta_g"}}),
          ("stirrups/A_v", {"value": 100.0})),
    lines(7, "the simplified method is used with bars above 400 MPa", "shear-2-left/V_c",
          ("shear-2-left/V_c", {"args": {"beta": "shear-2-left/beta_g"}}),
          ("materials/f_y", {"value": 500.0})),
    lines(7, "230/(1000 + d_v) is used with an aggregate below 20 mm", "shear-2-left/beta",
          ("shear-2-left/beta", {"formula": "beta = 230/(1000 + d_v)",
                                 "args": {"d_v": "shear-2-left/d_v"}}),
          ("given/a_max", {"value": 14.0})),
    lines(8, "a beam deeper than 750 mm stands without stirrups", "shear-2-left/V_r",
          ("shear-2-left/V_r", {"formula": "V_r = V_c"}), ("given/h", {"value": 800.0})),
    line(8, "half of V_c is the limit of another standard", "shear-2-left/shear-halves-spacing",
         formula="V_f > 0.5*V_c", args={"V_c": "shear-2-left/V_c"}),
    line(9, "bars on the face in compression are counted", "shear-1-left/eps_x",
         args={"A_s": "shear-1-left/A_sp"}),
    line(9, "all bars of the section count, developed or not", "shear-1-left/eps_x",
         args={"A_s": "sag-1/A_s"}),
    line(10, "the section is taken from the axis of the support", "shear-2-left/x_f",
         formula="x_f = d_v", args={"d_v": "shear-2-left/d_v"}),
    line(10, "the girder carries the beam from the side", "shear-1-left/x_f",
         formula="x_f = b_sn/2 + d_v", args={"d_v": "shear-1-left/d_v"}),
    lines(10, "a point load stands within d_v of the face", "shear-2-left/x_f",
          ("shear-2-left/shear-halves-spacing", {"symbol": "near-point-loads", "holds": False})),
    whole(11, "are checked by 12.11.3, not by 11.3.9.5", without("bars-end-support")),
    whole(11, "are checked by 11.3.9.5, not by 12.11.3", without("development-zero-moment")),
)  # fmt: skip

STIRRUPS = (
    line(25, "λ is left out", "shear-2-left/V_c",
         formula="V_c = phi_c*beta*min(1.0*sqrt(f_c), 8)*b_w*d_v"),
    line(25, "λ is left out", "materials/f_r", formula="f_r = 0.6*sqrt(f_c)"),
    line(25, "λ is left out", "torsion-1/T_cr", EDGE,
         formula="T_cr = A_c**2/p_c*0.38*phi_c*sqrt(f_c)"),
    line(25, "k_3 is left out", "anchorage-bar-1/l_d0",
         formula="l_d0 = 0.45*min(k_1*k_2, 1.7)*k_4*f_y/min(sqrt(f_c), 8)*d_b"),
    whole(26, "torsion counts, but no stirrups are designed for it",
          without("stirrups-shear-torsion"), EDGE),
    line(26, "the largest spacing is not halved although torsion counts", "shear-1-left/s_max",
         EDGE, formula="s_max = min(0.7*d_v, 600)"),
    whole(26, "is more than a quarter of T_cr and left out", without("torsion-counts"), EDGE),
    whole(26, "stirrups S02 from 75 mm are open although torsion counts", open_stirrups, EDGE),
    line(28, "half the depth is the limit of another standard", "shear-2-left/s_max",
         formula="s_max = min(d_v/2, 600)"),
    line(28, "a truss of 45° is that of another standard", "shear-2-left/V_s",
         formula="V_s = phi_s*A_v*f_y*d_v/s"),
    line(28, "is the size factor of another standard", "shear-2-left/V_c",
         formula="V_c = phi_c*lambda_*0.035*(1 + sqrt(200/d_v))*sqrt(f_c)*b_w*d_v"),
    line(28, "the coefficient of √f'c is that of another standard", "shear-2-left/V_c",
         formula="V_c = 0.17*lambda_*phi_c*sqrt(f_c)*b_w*d_v"),
    line(31, "one leg of the stirrups is counted", "shear-2-left/V_s",
         args={"A_v": "stirrups/A_t"}),
    line(31, "all legs are counted for torsion", "shear-1-left/a_t", EDGE,
         formula="a_t = T_f*A_t/(2*A_o*phi_s*f_y*cot(theta)*A_t)", args={"A_t": "stirrups/A_v"}),
)  # fmt: skip
