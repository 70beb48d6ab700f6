"""Clauses 11.3.9 and 11.2.12: bars along the beam that shear requires; hanger stirrups."""

from __future__ import annotations

from functools import partial

from lineproof.formula import FROM_MEMORY, criterion, formula
from lineproof.standards.a23_3.notation import NOTATION as A23_3
from lineproof.standards.nbc.notation import NOTATION as NBC
from lineproof.standards.references import MECHANICS, SHEAR_2004

_formula = partial(formula, notation=A23_3 | NBC)
_criterion = partial(criterion, notation=A23_3 | NBC)

TENSION_SIDE = _formula(
    "F_lt = M_f/d_v + (V_f - 0.5*min(V_s, V_f))*cot(theta)",
    clause="11.3.9.2",
    title="Force in the bars on the tension side",
    basis=SHEAR_2004,
)
TENSION_SIDE_CAPPED = _formula(
    "F_ltc = min(F_lt, phi_s*A_sr*f_y)",
    clause="11.3.9.4",
    title="Force in the bars, at most that of the largest moment alone",
    basis=FROM_MEMORY,
)
COMPRESSION_SIDE = _formula(
    "F_lc = max((V_f - 0.5*min(V_s, V_f))*cot(theta) - M_f/d_v, 0)",
    clause="11.3.9.3",
    title="Force in the bars on the compression side",
    basis=FROM_MEMORY,
)
END_SUPPORT = _formula(
    "F_le = (V_f - 0.5*min(V_s, V_f))*cot(theta)",
    clause="11.3.9.5",
    title="Force in the bottom bars at the inner edge of the bearing",
    basis=FROM_MEMORY,
)
AREA_TENSION_SIDE = _formula(
    "A_lt = F_lt/(phi_s*f_y)",
    clause="11.3.9.1",
    title="Bars required for the force on the tension side",
    basis=SHEAR_2004,
)
AREA_END_SUPPORT = _formula(
    "A_le = F_le/(phi_s*f_y)",
    clause="11.3.9.5",
    title="Bottom bars required at the inner edge of the bearing",
    basis=FROM_MEMORY,
)
TENSION_SIDE_HOLDS = _criterion(
    "F_lt <= phi_s*A_sd*f_y",
    clause="11.3.9.1",
    title="Bars on the tension side, with shear",
    basis=SHEAR_2004,
    yes="The bars on the tension side carry moment and shear.",
    no="The bars on the tension side do NOT carry moment and shear.",
    key="bars-tension-side",
)
CAPPED_HOLDS = _criterion(
    "F_ltc <= phi_s*A_sd*f_y",
    clause="11.3.9.4",
    title="Tension bars under moment and shear, direct support",
    basis=FROM_MEMORY,
    yes="The bars on the tension side carry moment and shear.",
    no="The bars on the tension side do NOT carry moment and shear.",
    key="bars-tension-side",
)
COMPRESSION_SIDE_HOLDS = _criterion(
    "F_lc <= phi_s*A_sp*f_y",
    clause="11.3.9.3",
    title="Bars on the compression side, with shear",
    basis=FROM_MEMORY,
    yes="The bars on the compression side carry the tension that shear leaves there.",
    no="The bars on the compression side do NOT carry the tension that shear leaves there.",
    key="bars-compression-side",
)
END_SUPPORT_HOLDS = _criterion(
    "F_le <= phi_s*A_sd*f_y",
    clause="11.3.9.5",
    title="Bottom bars at the inner edge of the bearing",
    basis=FROM_MEMORY,
    yes="The bottom bars are anchored for the force at the support.",
    no="The bottom bars are NOT anchored for the force at the support.",
    key="bars-end-support",
)

HANGERS = _formula(
    "A_hr = R_f/(phi_s*f_y)",
    clause="11.2.12",
    title="Hanger stirrups where a beam is carried by a beam, whole reaction",
    basis=MECHANICS,
)
HANGER_LEGS = _formula(
    "A_h = n_h*A_v",
    clause="11.2.12",
    title="Area of the legs of the hanger stirrups",
    basis=MECHANICS,
)
HANGERS_PROVIDED = _criterion(
    "A_hr <= A_h",
    clause="11.2.12",
    title="Hanger stirrups in the joint",
    basis=FROM_MEMORY,
    yes="The hanger stirrups carry the reaction.",
    no="The hanger stirrups do NOT carry the reaction.",
    key="hanger-stirrups",
)

HOOKS_SUFFICE = _criterion(
    "d_bs <= 16",
    clause="12.13.2",
    title="Anchorage of the stirrups: a standard hook around a bar in each corner",
    basis=FROM_MEMORY,
    numbers={"16": "mm"},
    yes="At most 15M: a standard hook around a bar in each corner anchors the stirrups.",
    no="Thicker than 15M: a standard hook alone does NOT anchor the stirrups.",
    key="stirrup-hooks",
)
CORNERS_HELD = _criterion(
    "2 <= n_cb",
    clause="12.13.2",
    title="Bars in the corners of the stirrups",
    basis=FROM_MEMORY,
    yes="A bar stands in each corner of the stirrups, all along the beam.",
    no="Stirrups stand where bars are missing in their corners: they are NOT anchored there.",
    key="stirrup-corners",
)

FORMULAS = (
    TENSION_SIDE,
    TENSION_SIDE_CAPPED,
    COMPRESSION_SIDE,
    END_SUPPORT,
    AREA_TENSION_SIDE,
    AREA_END_SUPPORT,
    HANGERS,
    HANGER_LEGS,
)
CRITERIA = (
    TENSION_SIDE_HOLDS,
    CAPPED_HOLDS,
    COMPRESSION_SIDE_HOLDS,
    END_SUPPORT_HOLDS,
    HANGERS_PROVIDED,
    HOOKS_SUFFICE,
    CORNERS_HELD,
)
