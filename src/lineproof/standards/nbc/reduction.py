"""NBC 4.1.5.8: live load reduction by tributary area, and where there is none."""

from __future__ import annotations

from functools import partial

from lineproof.formula import Formula, criterion, formula
from lineproof.sheet import LookupTable
from lineproof.standards.a23_3.notation import NOTATION as A23_3
from lineproof.standards.nbc import loads
from lineproof.standards.nbc.notation import NOTATION
from lineproof.standards.references import MECHANICS, NBC_LOADS

_formula = partial(formula, notation=NOTATION | A23_3, system="kN-m", clause="NBC 4.1.5.8")
_criterion = partial(criterion, notation=NOTATION | A23_3, system="kN-m", clause="NBC 4.1.5.8")

HEAVY, OTHER = "assembly, storage, manufacturing, retail, garage", "other use"
AREAS = LookupTable(
    "Live load reduction: areas",
    "group of uses of the live load reduction",
    {"A_0": "m2", "A_Lmin": "m2"},
    {HEAVY: {"A_0": "20", "A_Lmin": "80"}, OTHER: {"A_0": "9.8", "A_Lmin": "20"}},
    "NBC Division B, 4.1.5.8",
    clause="NBC 4.1.5.8",
    basis=NBC_LOADS,
)

_NEVER = ("roof",)
_ASSEMBLY = (
    "assembly area", "lobby or corridor", "exit", "exterior balcony", "classroom", "reading room",
)  # fmt: skip
_HEAVY = (
    "retail area", "storage area", "factory", "library stack room", "garage, vehicles to 4000 kg",
    "garage, vehicles to 9000 kg", "garage, vehicles above 9000 kg",
)  # fmt: skip
_OTHER = (
    "kitchen", "office", "office at grade or in a basement", "residential area", "patients' room",
    "operating room or laboratory", "equipment room",
)  # fmt: skip
_LEAST_OF_ASSEMBLY = 4.8e-3
"""Live load from which assembly occupancies are reduced at all [MPa]."""

TRIBUTARY_AREA = _formula(
    "A_L = l*b_tr", title="Tributary area of the beam, of this use only", basis=MECHANICS
)
LARGE_ENOUGH = _criterion(
    "A_L > A_Lmin",
    title="Whether the tributary area allows a reduction",
    basis=NBC_LOADS,
    yes="The tributary area is large enough: the live load may be reduced.",
    no="The tributary area is too small: the live load is not reduced.",
    key="live-load-reduction",
)
FACTOR_HEAVY = _formula(
    "r_L = 0.5 + sqrt(A_0/A_L)",
    title="Live load reduction, assembly, storage, manufacturing, retail, garage",
    basis=NBC_LOADS,
)
FACTOR_OTHER = _formula(
    "r_L = 0.3 + sqrt(A_0/A_L)", title="Live load reduction, other uses", basis=NBC_LOADS
)
LIVE_REDUCED = _formula(
    "w_L = r_L*q_L*b_tr", title="Live load on the tributary width, reduced", basis=NBC_LOADS
)


def reduction(use: str, q_L: float, building: str, *, slab: bool = False) -> Formula | None:
    """Return the expression for a use and its live load ``q_L`` [MPa], None where none applies.

    None for roofs, assembly occupancies below 4.8 kPa (classrooms and reading rooms are such) and,
    since NBC 2020, slabs. Corridors, exits and balconies count as assembly, stack rooms as
    storage: the smaller reduction where the use does not tell. Raises :class:`UserError` for a
    use that is not in the table of live loads.
    """
    loads.USES.row(use, "use")
    if (slab and building != "NBC 2015") or use in _NEVER:
        return None
    if use in _ASSEMBLY:
        return FACTOR_HEAVY if q_L >= _LEAST_OF_ASSEMBLY * (1 - 1e-12) else None
    return FACTOR_HEAVY if use in _HEAVY else FACTOR_OTHER


FORMULAS = (TRIBUTARY_AREA, FACTOR_HEAVY, FACTOR_OTHER, LIVE_REDUCED)
CRITERIA = (LARGE_ENOUGH,)
TABLES = (AREAS,)
