"""NBC Table 4.1.3.2.-A: principal and companion loads as data, cases as formulas.

Dead and live load are used so far; snow, wind and earthquake companions stand in the table for
the beams that will carry them.
"""

from __future__ import annotations

from dataclasses import dataclass, field

from lineproof.formula import Formula, formula
from lineproof.standards.a23_3.notation import NOTATION as A23_3
from lineproof.standards.nbc.notation import NOTATION
from lineproof.standards.references import NBC_LOADS

CLAUSE = "4.1.3.2"


@dataclass(frozen=True, slots=True)
class Companion:
    """A companion load and its factor; storage areas add ``storage_extra`` to a live companion."""

    load: str
    factor: str
    storage_extra: str = "0"


@dataclass(frozen=True, slots=True)
class Case:
    """One case: factors of dead load (the second where it counteracts), principal, companions."""

    number: int
    dead: tuple[str, ...]
    principal: tuple[str, str] | None = None
    companions: tuple[Companion, ...] = field(default_factory=tuple)


CASES = (
    Case(1, ("1.4",)),
    Case(2, ("1.25", "0.9"), ("L", "1.5"), (Companion("S", "1.0"), Companion("W", "0.4"))),
    Case(3, ("1.25", "0.9"), ("S", "1.5"), (Companion("L", "1.0", "0.5"), Companion("W", "0.4"))),
    Case(4, ("1.25", "0.9"), ("W", "1.4"), (Companion("L", "0.5", "0.5"), Companion("S", "0.5"))),
    Case(5, ("1.0",), ("E", "1.0"), (Companion("L", "0.5", "0.5"), Companion("S", "0.25"))),
)


def factored(case: Case, symbol: str, *, dead: int = 0, companion: str = "") -> Formula:
    """Return the formula of one case for uniform loads ``w_D``, ``w_L``, ``w_S``, ...

    ``dead`` picks the factor of dead load (1: it counteracts); ``companion`` adds one companion
    load, none is the check with companion = 0 that the code asks for as well.
    """
    terms = [f"{case.dead[dead]}*w_D"]
    if case.principal is not None:
        load, factor = case.principal
        terms.append(f"{factor}*w_{load}")
    terms += [f"{c.factor}*w_{c.load}" for c in case.companions if c.load == companion]
    return formula(
        f"{symbol} = {' + '.join(terms)}",
        unit="kN/m",
        clause=CLAUSE,
        title=f"Factored load, case {case.number}",
        basis=NBC_LOADS,
        system="kN-m",
        notation=NOTATION | A23_3,
    )


CASE_1 = factored(CASES[0], "w_f1")
CASE_2 = factored(CASES[1], "w_f2")
GOVERNING = formula(
    "w_f = max(w_f1, w_f2)",
    clause=CLAUSE,
    title="Largest factored load",
    basis=NBC_LOADS,
    system="kN-m",
    notation=NOTATION | A23_3,
)

FORMULAS = (CASE_1, CASE_2, GOVERNING)
