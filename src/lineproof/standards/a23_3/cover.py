"""Cover for durability (A23.1) and for fire (NBC Appendix D)."""

from __future__ import annotations

from functools import partial

from lineproof.formula import FROM_MEMORY, criterion, formula
from lineproof.sheet import LookupTable
from lineproof.standards.a23_3.notation import NOTATION
from lineproof.standards.references import MECHANICS, NBC_APPENDIX_D

_formula = partial(formula, notation=NOTATION)
_criterion = partial(criterion, notation=NOTATION)


def _class(cover: str, ratio: str, least_f_c: str) -> dict[str, str]:
    return {"c_min": cover, "r_cb": ratio, "r_ca": ratio, "f_cmin": least_f_c}


EXPOSURES = LookupTable(
    "Exposure classes: cover of beams and least strength",
    "exposure class of reinforced beams",
    {"c_min": "mm", "r_cb": "", "r_ca": "", "f_cmin": "MPa"},
    {
        "N": _class("30", "1.0", "20"),
        "F-1": _class("40", "1.5", "30"),
        "F-2": _class("40", "1.5", "25"),
        "S-1": _class("40", "1.5", "35"),
        "S-2": _class("40", "1.5", "32"),
        "S-3": _class("40", "1.5", "30"),
        "C-XL": _class("60", "2.0", "50"),
        "C-1": _class("60", "2.0", "35"),
        "C-3": _class("60", "2.0", "30"),
        "C-4": _class("60", "2.0", "25"),
        "A-1": _class("60", "2.0", "35"),
        "A-2": _class("60", "2.0", "32"),
        "A-3": _class("60", "2.0", "30"),
        "A-4": _class("60", "2.0", "25"),
    },
    "CSA A23.1, Tables 2 and 17",
    clause="A23.1 Table 17",
    basis=FROM_MEMORY,
    clauses={"f_cmin": "A23.1 Table 2"},
)
_RATINGS = ("0.5 h", "0.75 h", "1 h", "1.5 h", "2 h", "3 h", "4 h")
FIRE_COVER = LookupTable(
    "Cover to principal reinforcement of beams for fire",
    "fire rating of the table",
    {"c_fire": "mm"},
    {
        rating: {"c_fire": cover}
        for rating, cover in zip(_RATINGS, ("20", "20", "20", "25", "25", "39", "50"), strict=True)
    },
    "NBC Division B, Appendix D, D-2.9",
    clause="NBC D-2.9",
    basis=NBC_APPENDIX_D,
)
FIRE_SLAB = LookupTable(
    "Least thickness of slabs for fire",
    "fire rating of the table",
    {"S": "mm", "N": "mm"},
    {
        rating: {"S": s, "N": n}
        for rating, s, n in zip(
            _RATINGS,
            ("60", "77", "90", "112", "130", "158", "180"),
            ("59", "74", "87", "108", "124", "150", "171"),
            strict=True,
        )
    },
    "NBC Division B, Appendix D, D-2.2",
    clause="NBC D-2.9.4",
    basis=NBC_APPENDIX_D,
)

COVER_TO_BARS = _formula(
    "c_b1 = c_c + d_bs",
    clause="geometry",
    title="Clear cover to the principal bars",
    basis=MECHANICS,
)
COVER_REQUIRED_STIRRUP = _formula(
    "c_rs = max(c_min, r_cb*d_bs, r_ca*a_max)",
    unit="mm",
    clause="A23.1 Table 17",
    title="Least cover of the stirrup for durability",
    basis=FROM_MEMORY,
)
COVER_REQUIRED_BAR = _formula(
    "c_rb = max(c_min, r_cb*d_b, r_ca*a_max)",
    unit="mm",
    clause="A23.1 Table 17",
    title="Least cover of the principal bars for durability",
    basis=FROM_MEMORY,
)
DURABLE = _criterion(
    "c_rs <= c_c",
    unit="mm",
    clause="A23.1 Table 17",
    title="Cover of the stirrup for durability",
    basis=FROM_MEMORY,
    yes="The stirrup is covered as the exposure requires.",
    no="The stirrup is NOT covered as the exposure requires.",
    key="cover-stirrup",
)
DURABLE_BAR = _criterion(
    "c_rb <= c_b1",
    unit="mm",
    clause="A23.1 Table 17",
    title="Cover of the principal bars for durability",
    basis=FROM_MEMORY,
    yes="The principal bars are covered as the exposure requires.",
    no="The principal bars are NOT covered as the exposure requires.",
    key="cover-bars",
)
ENDS_COVERED = _criterion(
    "c_rb <= c_end",
    unit="mm",
    clause="A23.1 Table 17",
    title="Cover of the ends of the bars for durability",
    basis=FROM_MEMORY,
    yes="The ends of the bars are covered as the exposure requires.",
    no="The ends of the bars are NOT covered as the exposure requires.",
    key="cover-ends",
)
FIRE_SAFE = _criterion(
    "c_fire <= c_b1",
    clause="NBC D-2.9",
    title="Cover of the principal bars for fire",
    basis=NBC_APPENDIX_D,
    yes="The principal bars are covered as the fire rating requires.",
    no="The principal bars are NOT covered as the fire rating requires.",
    key="cover-fire",
)
FIRE_SAFE_SLAB = _criterion(
    "h_fire <= h_f",
    clause="NBC D-2.9.4",
    title="Thickness of the slab over the beam for fire",
    basis=NBC_APPENDIX_D,
    yes="The slab is as thick as the fire rating requires.",
    no="The slab is NOT as thick as the fire rating requires.",
    key="slab-fire",
)
STRONG_ENOUGH = _criterion(
    "f_cmin <= f_c",
    clause="A23.1 Table 2",
    title="Strength of the concrete for the exposure",
    basis=FROM_MEMORY,
    yes="The concrete is as strong as the exposure requires.",
    no="The concrete is NOT as strong as the exposure requires.",
    key="strength-for-exposure",
)
WIDE_ENOUGH_TWO_HOURS = _criterion(
    "140 <= b_w",
    clause="NBC D-2.9",
    title="Width of the beam for a rating above 2 h",
    basis=NBC_APPENDIX_D,
    numbers={"140": "mm"},
    yes="The web is as wide as the fire rating requires.",
    no="The web is NOT as wide as the fire rating requires.",
    key="width-fire",
)
WIDE_ENOUGH_THREE_HOURS = _criterion(
    "165 <= b_w",
    clause="NBC D-2.9",
    title="Width of the beam for a rating above 3 h",
    basis=NBC_APPENDIX_D,
    numbers={"165": "mm"},
    yes="The web is as wide as the fire rating requires.",
    no="The web is NOT as wide as the fire rating requires.",
    key="width-fire",
)
WIDE_ENOUGH = _criterion(
    "100 <= b_w",
    clause="NBC D-2.9",
    title="Least width of beams in the fire tables",
    basis=NBC_APPENDIX_D,
    numbers={"100": "mm"},
    yes="The web is as wide as the fire rating requires.",
    no="The web is NOT as wide as the fire rating requires.",
    key="width-fire",
)

FORMULAS = (COVER_TO_BARS, COVER_REQUIRED_STIRRUP, COVER_REQUIRED_BAR)
CRITERIA = (
    DURABLE,
    DURABLE_BAR,
    ENDS_COVERED,
    FIRE_SAFE,
    FIRE_SAFE_SLAB,
    STRONG_ENOUGH,
    WIDE_ENOUGH,
    WIDE_ENOUGH_TWO_HOURS,
    WIDE_ENOUGH_THREE_HOURS,
)
TABLES = (EXPOSURES, FIRE_COVER, FIRE_SLAB)
