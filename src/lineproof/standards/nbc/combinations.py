"""NBC 4.1.3: principal and companion loads as data, cases as formulas.

Table 4.1.3.2.-A for strength (no crane), Table 4.1.3.4 for service of concrete members, which
creep.  Storage areas, equipment areas and service rooms add to a companion live load.
"""

from __future__ import annotations

from dataclasses import dataclass, field
from decimal import Decimal
from functools import partial

from lineproof.formula import Formula, formula
from lineproof.standards.a23_3.notation import NOTATION as A23_3
from lineproof.standards.nbc.notation import NOTATION
from lineproof.standards.references import MECHANICS, NBC_LOADS, NBC_SERVICE

CLAUSE = "NBC 4.1.3.2"
SERVICE_CLAUSE = "NBC 4.1.3.4"


@dataclass(frozen=True, slots=True)
class Companion:
    """A companion load and its factor; storage areas add ``storage_extra`` to a live companion."""

    load: str
    factor: str
    storage_extra: str = "0"

    def term(self, *, storage: bool) -> str:
        """Return the term of a formula, ``1.5*w_L`` for live load on a storage area."""
        if not storage or self.storage_extra == "0":
            return f"{self.factor}*w_{self.load}"
        factor = float(Decimal(self.factor) + Decimal(self.storage_extra))
        return f"{factor}*w_{self.load}"


@dataclass(frozen=True, slots=True)
class Case:
    """One case: factors of dead load (the second where it counteracts), principal, companions."""

    number: int
    dead: tuple[str, ...]
    principal: tuple[str, str] | None = None
    companions: tuple[Companion, ...] = field(default_factory=tuple)


DEAD, LIVE = "1.25", "1.5"
"""Factors of dead and of live load where both add up, as written."""
CASES = (
    Case(1, ("1.4",)),
    Case(2, (DEAD, "0.9"), ("L", LIVE), (Companion("S", "1.0"), Companion("W", "0.4"))),
    Case(3, (DEAD, "0.9"), ("S", "1.5"), (Companion("L", "1.0", "0.5"), Companion("W", "0.4"))),
    Case(4, (DEAD, "0.9"), ("W", "1.4"), (Companion("L", "0.5", "0.5"), Companion("S", "0.5"))),
    Case(5, ("1.0",), ("E", "1.0"), (Companion("L", "0.5", "0.5"), Companion("S", "0.25"))),
)
FACTORS = tuple(
    dict.fromkeys(
        factor
        for case in CASES
        for factor in (*case.dead, *(case.principal[1:] if case.principal else ()))
        if factor != "1.0"
    )
)
"""Factors of dead and principal loads, as written."""
SERVICE_CASES = (
    Case(1, ("1.0",), ("L", "1.0"), (Companion("W", "0.3"), Companion("S", "0.35"))),
    Case(2, ("1.0",), ("W", "1.0"), (Companion("L", "0.35", "0.15"), Companion("S", "0.35"))),
    Case(3, ("1.0",), ("S", "1.0"), (Companion("W", "0.3"), Companion("L", "0.35", "0.15"))),
)
"""Live load of case 1 is the sustained and the transient part together."""

_in_metres = partial(formula, unit="kN/m", system="kN-m", notation=NOTATION | A23_3)


def factored(
    case: Case, symbol: str, *, dead: int = 0, companion: str = "", storage: bool = False
) -> Formula:
    """Return the formula of one case for uniform loads ``w_D``, ``w_L``, ``w_S``, ...

    ``dead`` picks the factor of dead load (1: it counteracts); ``companion`` adds one companion
    load, none is the check with companion = 0 that the code asks for as well; ``storage`` tells
    that the companion live load is one of storage areas, equipment areas or service rooms.
    """
    return _in_metres(
        f"{symbol} = {_sum(case, dead=dead, companion=companion, storage=storage)}",
        clause=CLAUSE,
        title=f"Factored load, case {case.number}",
        basis=NBC_LOADS,
    )


def specified(case: Case, symbol: str, *, companion: str = "", storage: bool = False) -> Formula:
    """Return the formula of one service case; arguments as in :func:`factored`."""
    return _in_metres(
        f"{symbol} = {_sum(case, dead=0, companion=companion, storage=storage)}",
        clause=SERVICE_CLAUSE,
        title=f"Specified load, case {case.number}",
        basis=NBC_SERVICE,
    )


def _sum(case: Case, *, dead: int, companion: str, storage: bool) -> str:
    terms = [f"{case.dead[dead]}*w_D"]
    if case.principal is not None:
        load, factor = case.principal
        terms.append(f"{factor}*w_{load}")
    terms += [c.term(storage=storage) for c in case.companions if c.load == companion]
    return " + ".join(terms)


CASE_1 = factored(CASES[0], "w_f1")
CASE_2 = factored(CASES[1], "w_f2")
CASE_2_SNOW = factored(CASES[1], "w_f2", companion="S")
CASE_2_COUNTERACTING = factored(CASES[1], "w_f2", dead=1)
CASE_3 = factored(CASES[2], "w_f3")
CASE_3_LIVE = factored(CASES[2], "w_f3", companion="L")
CASE_3_STORAGE = factored(CASES[2], "w_f3", companion="L", storage=True)
GOVERNING = formula(
    "w_f = max(w_f1, w_f2)",
    clause=CLAUSE,
    title="Largest factored load",
    basis=NBC_LOADS,
    system="kN-m",
    notation=NOTATION | A23_3,
)
SERVICE_1 = specified(SERVICE_CASES[0], "w_s1")
SERVICE_1_SNOW = specified(SERVICE_CASES[0], "w_s1", companion="S")
SERVICE_3 = specified(SERVICE_CASES[2], "w_s3")
SERVICE_3_LIVE = specified(SERVICE_CASES[2], "w_s3", companion="L")
SERVICE_3_STORAGE = specified(SERVICE_CASES[2], "w_s3", companion="L", storage=True)
SUSTAINED_LIVE = _in_metres(
    "w_Ls = r_Ls*w_L",
    clause=SERVICE_CLAUSE,
    title="Sustained part of the live load",
    basis=MECHANICS,
)
TRANSIENT_LIVE = _in_metres(
    "w_Lt = w_L - w_Ls",
    clause=SERVICE_CLAUSE,
    title="Transient part of the live load",
    basis=MECHANICS,
)
SUSTAINED = _in_metres(
    "w_sus = w_D + w_Ls",
    clause=SERVICE_CLAUSE,
    title="Load under which the member creeps",
    basis=NBC_SERVICE,
)

FORMULAS = (
    CASE_1, CASE_2, CASE_2_SNOW, CASE_2_COUNTERACTING, CASE_3, CASE_3_LIVE, CASE_3_STORAGE,
    GOVERNING, SERVICE_1, SERVICE_1_SNOW, SERVICE_3, SERVICE_3_LIVE, SERVICE_3_STORAGE,
    SUSTAINED_LIVE, TRANSIENT_LIVE, SUSTAINED,
)  # fmt: skip
