"""NBC 4.1.4 and 4.1.5: dead loads, specified live loads by use, and what one beam carries."""

from __future__ import annotations

from functools import partial

from lineproof.formula import FROM_MEMORY, criterion, formula
from lineproof.sheet import LookupTable
from lineproof.standards.a23_3.notation import NOTATION as A23_3
from lineproof.standards.nbc.notation import NOTATION
from lineproof.standards.references import MECHANICS, NBC_LOADS

_formula = partial(formula, notation=NOTATION | A23_3, system="kN-m")
_criterion = partial(criterion, notation=NOTATION | A23_3, system="kN-m")


def _use(kPa: str) -> dict[str, str]:
    return {"q_L": kPa}


USES = LookupTable(
    "Specified uniform live loads",
    "use of NBC Table 4.1.5.3",
    {"q_L": "kPa"},
    {
        "assembly area": _use("4.8"),
        "lobby or corridor": _use("4.8"),
        "exit": _use("4.8"),
        "retail area": _use("4.8"),
        "storage area": _use("4.8"),
        "kitchen": _use("4.8"),
        "exterior balcony": _use("4.8"),
        "classroom": _use("2.4"),
        "office": _use("2.4"),
        "office at grade or in a basement": _use("4.8"),
        "residential area": _use("1.9"),
        "patients' room": _use("1.9"),
        "operating room or laboratory": _use("3.6"),
        "equipment room": _use("3.6"),
        "factory": _use("6.0"),
        "library stack room": _use("7.2"),
        "reading room": _use("2.9"),
        "garage, vehicles to 4000 kg": _use("2.4"),
        "garage, vehicles to 9000 kg": _use("6.0"),
        "garage, vehicles above 9000 kg": _use("12.0"),
        "roof": _use("1.0"),
    },
    "NBC Division B, Table 4.1.5.3",
    clause="NBC 4.1.5.3",
    basis=NBC_LOADS,
)
UNIT_WEIGHT = LookupTable(
    "Unit weight of concrete",
    "kind of concrete",
    {"gamma_w": "kN/m3"},
    {"reinforced, normal density": {"gamma_w": "24"}},
    "common value of reinforced normal-density concrete",
    clause="NBC 4.1.4.1",
    basis=FROM_MEMORY,
)

PARTITION_ALLOWANCE = LookupTable(
    "Least allowance for partitions",
    "allowance for partitions",
    {"q_ptmin": "kPa"},
    {"partitions not drawn": {"q_ptmin": "1.0"}},
    "NBC Division B, 4.1.4.1",
    clause="NBC 4.1.4.1",
    basis=NBC_LOADS,
)

TRIBUTARY = _formula(
    "b_tr = s_b",
    clause="geometry",
    title="Tributary width, half the spacing on each side",
    basis=MECHANICS,
)
SLAB = _formula(
    "w_sl = gamma_w*h_f*b_tr",
    clause="NBC 4.1.4.1",
    title="Slab on the tributary width",
    basis=MECHANICS,
)
WEB = _formula(
    "w_wb = gamma_w*b_w*(h - h_f)",
    clause="NBC 4.1.4.1",
    title="Web below the slab (the slab is counted once)",
    basis=MECHANICS,
)
BEAM = _formula(
    "w_bm = gamma_w*b_w*h", clause="NBC 4.1.4.1", title="Weight of the beam", basis=MECHANICS
)
SUPERIMPOSED = _formula(
    "w_SD = q_SD*b_tr",
    clause="NBC 4.1.4.1",
    title="Superimposed dead load on the tributary width",
    basis=MECHANICS,
)
PARTITIONS = _formula(
    "w_pt = q_pt*b_tr",
    clause="NBC 4.1.4.1",
    title="Partitions, a dead load, on the tributary width",
    basis=NBC_LOADS,
)
PARTITIONS_ENOUGH = _criterion(
    "q_ptmin <= q_pt",
    clause="NBC 4.1.4.1",
    title="Allowance for partitions",
    basis=NBC_LOADS,
    yes="The allowance for partitions is not below the least one.",
    no="The allowance for partitions is BELOW the least one.",
    key="partitions",
)
SNOW = _formula(
    "w_S = q_S*b_tr",
    clause="NBC 4.1.6.2",
    title="Snow load on the tributary width",
    basis=MECHANICS,
)
CONSTRUCTION = _formula(
    "w_cn = q_cn*b_tr",
    clause="NBC 4.1.4.1",
    title="Load of the construction stage on the tributary width, beside the weight of the floor",
    basis=MECHANICS,
)
DEAD_WITH_SLAB = _formula(
    "w_D = w_sl + w_wb + w_SD", clause="NBC 4.1.4.1", title="Dead load", basis=MECHANICS
)
FLOOR = _formula(
    "w_fl = q_fl*b_tr",
    clause="NBC 4.1.4.1",
    title="Floor carried, on the tributary width",
    basis=MECHANICS,
)
DEAD_BEAM = _formula(
    "w_D = w_bm + w_fl + w_SD", clause="NBC 4.1.4.1", title="Dead load", basis=MECHANICS
)
LIVE = _formula(
    "w_L = q_L*b_tr",
    clause="NBC 4.1.5.3",
    title="Live load on the tributary width, not reduced",
    basis=MECHANICS,
)
LIVE_IS_ENOUGH = _criterion(
    "q_Lmin <= q_L",
    clause="NBC 4.1.5.3",
    title="Live load given against the least of the use",
    basis=NBC_LOADS,
    yes="The live load given is not below the least of the use.",
    no="The live load given is BELOW the least of the use.",
    key="live-load",
)
MOMENT_SIMPLE = _formula(
    "M_f = w_f*l**2/8",
    clause="statics",
    title="Factored moment at midspan, simple span",
    basis=MECHANICS,
)
SHEAR_SIMPLE = _formula(
    "V_f = w_f*l/2",
    clause="statics",
    title="Factored shear at the centre of the support",
    basis=MECHANICS,
)
REACTION_DEAD = _formula(
    "R_D = w_D*l/2", clause="statics", title="Reaction, dead load, unfactored", basis=MECHANICS
)
REACTION_LIVE = _formula(
    "R_L = w_L*l/2", clause="statics", title="Reaction, live load, unfactored", basis=MECHANICS
)
MOMENT_END_GIRDER = _formula(
    "M_f = w_f*l**2/24",
    clause="9.3.3",
    title="Moment at an end cast with a girder, coefficient on the full span",
    basis=FROM_MEMORY,
)
MOMENT_END_COLUMN = _formula(
    "M_f = w_f*l**2/16",
    clause="9.3.3",
    title="Moment at an end cast with a column, coefficient on the full span",
    basis=FROM_MEMORY,
)

FORMULAS = (
    TRIBUTARY,
    SLAB,
    WEB,
    BEAM,
    SUPERIMPOSED,
    PARTITIONS,
    SNOW,
    CONSTRUCTION,
    DEAD_WITH_SLAB,
    FLOOR,
    DEAD_BEAM,
    LIVE,
    MOMENT_SIMPLE,
    SHEAR_SIMPLE,
    REACTION_DEAD,
    REACTION_LIVE,
    MOMENT_END_GIRDER,
    MOMENT_END_COLUMN,
)
CRITERIA = (LIVE_IS_ENOUGH, PARTITIONS_ENOUGH)
TABLES = (USES, UNIT_WEIGHT, PARTITION_ALLOWANCE)
