"""Clause 12.5: standard hooks in tension, A23.3-14 and A23.3:19.

A23.3:24 has a new expression whose coefficients are not known here; it is refused.
"""

from __future__ import annotations

from functools import partial

from lineproof.errors import UserError
from lineproof.formula import COMMON_PRACTICE, FROM_MEMORY, Formula, criterion, formula
from lineproof.sheet import LookupTable
from lineproof.standards.a23_3.notation import NOTATION
from lineproof.standards.codes import CodePair
from lineproof.standards.references import MECHANICS

_formula = partial(formula, notation=NOTATION)
_criterion = partial(criterion, notation=NOTATION)

COVER_FACTORS = LookupTable(
    "Hooks: factor for cover, bars up to 35M",
    "cover of the hook",
    {"k_hc": ""},
    {
        "side cover 60 mm and tail cover 50 mm or more": {"k_hc": "0.7"},
        "less": {"k_hc": "1.0"},
    },
    "A23.3, 12.5.3",
    clause="12.5.3",
    basis=FROM_MEMORY,
)
TIE_FACTORS = LookupTable(
    "Hooks: factor for ties",
    "ties around the hook",
    {"k_ht": ""},
    {
        "ties at 3 bar diameters or closer": {"k_ht": "0.8"},
        "ties that 12.5.4 asks for, side and top cover small": {"k_ht": "1.0"},
        "none": {"k_ht": "1.0"},
    },
    "A23.3, 12.5.3 and 12.5.4",
    clause="12.5.3",
    basis=FROM_MEMORY,
)
DENSITY_FACTORS = LookupTable(
    "Hooks: factor for density",
    "density of concrete",
    {"k_hd": ""},
    {"normal": {"k_hd": "1.0"}, "semi-low": {"k_hd": "1.3"}, "low": {"k_hd": "1.3"}},
    "A23.3, 12.5.3 (semi-low as low)",
    clause="12.5.3",
    basis=FROM_MEMORY,
)
COATING_FACTORS = LookupTable(
    "Hooks: factor for coating",
    "coating of the bars",
    {"k_he": ""},
    {"epoxy": {"k_he": "1.2"}, "none": {"k_he": "1.0"}},
    "A23.3, 12.5.3",
    clause="12.5.3",
    basis=FROM_MEMORY,
)

BASIC = _formula(
    "l_hb = 100*d_b/min(sqrt(f_c), 8)*f_y/400",
    clause="12.5.2",
    title="Basic development length of a hook",
    basis=FROM_MEMORY,
    numbers={"100": "MPa^0.5", "8": "MPa^0.5", "400": "MPa"},
)
L_DH = _formula(
    "l_dh = max(k_hc*k_ht*k_hd*k_he*l_hb, 8*d_b, 150)",
    unit="mm",
    clause="12.5.1",
    title="Development length of a hook",
    basis=FROM_MEMORY,
    numbers={"150": "mm"},
)
L_DH_EXCESS = _formula(
    "l_dh = max(k_hc*k_ht*k_hd*k_he*min(A_sr/A_s, 1)*l_hb, 8*d_b, 150)",
    unit="mm",
    clause="12.5.3",
    title="Development length of a hook, more steel than required",
    basis=FROM_MEMORY,
    numbers={"150": "mm"},
)
SIDE_COVER = _formula(
    "c_side = c_c + d_bs",
    clause="geometry",
    title="Side cover of the hook, support as wide as the beam",
    basis=MECHANICS,
)
SIDE_COVER_COLUMN = _formula(
    "c_side = (b_col - b_w)/2 + c_c + d_bs",
    clause="geometry",
    title="Side cover of the hook in a support of another width",
    basis=MECHANICS,
)
FACE_COVER = _formula(
    "c_top = c_c + d_bs",
    clause="geometry",
    title="Cover of the hooked bars at the top or bottom face",
    basis=MECHANICS,
)
AVAILABLE = _formula(
    "l_av = b_sp - c_end",
    clause="geometry",
    title="Length from the face of the support to the end of the bars",
    basis=MECHANICS,
)
SIDE_COVERED = _criterion(
    "60 <= c_side",
    clause="12.5.3",
    title="Side cover of the hook",
    basis=FROM_MEMORY,
    numbers={"60": "mm"},
    yes="The side cover is at least 60 mm.",
    no="The side cover is below 60 mm: no reduction for cover; ties where the beam ends.",
    key="hook-side-cover",
)
TAIL_COVERED = _criterion(
    "50 <= c_tail",
    clause="12.5.3",
    title="Cover on the tail of the hook",
    basis=FROM_MEMORY,
    numbers={"50": "mm"},
    yes="The cover on the tail is at least 50 mm.",
    no="The cover on the tail is below 50 mm: no reduction for cover.",
    key="hook-tail-cover",
)
FACE_COVERED = _criterion(
    "60 <= c_top",
    clause="12.5.4",
    title="Cover of the hooked bars at the top or bottom face",
    basis=FROM_MEMORY,
    numbers={"60": "mm"},
    yes="The cover is at least 60 mm.",
    no="The cover is below 60 mm: ties around the hooks where the beam ends.",
    key="hook-face-cover",
)
TIED = _criterion(
    "s_tie <= 3*d_b",
    clause="12.5.4",
    title="Ties around hooks of small cover where the beam ends",
    basis=FROM_MEMORY,
    yes="The ties around the hooks are close enough.",
    no="The ties around the hooks are NOT close enough.",
    key="hook-ties",
)
TIES_CLEAR = _criterion(
    "s_tie >= d_bs + max(1.4*d_bs, 1.4*a_max, 30)",
    clause="A23.1 6.6.5.2",
    title="Clear distance of the ties around hooks, as between bars",
    basis=COMMON_PRACTICE,
    numbers={"30": "mm"},
    yes="The concrete passes between the ties.",
    no="The concrete does NOT pass between the ties: thicker bars, thinner ties or a smaller "
    "aggregate.",
    key="hook-ties-clear",
)
FITS = _criterion(
    "max(8*d_b, 150) <= l_av",
    clause="12.5.1",
    title="Least length for the hook",
    basis=FROM_MEMORY,
    numbers={"150": "mm"},
    yes="The hook has its least length.",
    no="The hook does NOT fit: thinner bars or a wider support.",
    key="hook-least-length",
)
IN_PART = _criterion(
    "l_av < l_dh",
    clause="12.5.3",
    title="Whether the hook is developed in part",
    basis=FROM_MEMORY,
    yes="Of the area of the bars as much counts as the first length is of the second, at the face "
    "of the support and wherever else they are used: more steel than required lets the hook be "
    "shorter.",
    no="The hook is developed in full.",
    key="hook-in-part",
)


def basic_length(pair: CodePair) -> Formula:
    """Return the basic development length of a hook in the edition of the pair.

    Raises :class:`UserError` for A23.3:24, whose expression is not known here.
    """
    if pair.concrete == "CSA A23.3:24":
        raise UserError(
            f"codes.pair: {pair.name!r}: hooks cannot be calculated: {pair.concrete} changed 12.5 "
            "to a form with the bar diameter to the power 1.5, whose coefficients are not "
            "known here; the earlier form can be too short. Anchor the bars straight"
        )
    return BASIC


FORMULAS = (BASIC, L_DH, L_DH_EXCESS, SIDE_COVER, SIDE_COVER_COLUMN, FACE_COVER, AVAILABLE)
CRITERIA = (SIDE_COVERED, TAIL_COVERED, FACE_COVERED, TIED, TIES_CLEAR, FITS, IN_PART)
TABLES = (COVER_FACTORS, TIE_FACTORS, DENSITY_FACTORS, COATING_FACTORS)
