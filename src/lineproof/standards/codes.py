"""Code pairs: a building code and the concrete standard it adopts, locked together."""

from __future__ import annotations

from dataclasses import dataclass

from lineproof.errors import UserError
from lineproof.quantity import echo


@dataclass(frozen=True, slots=True)
class CodePair:
    """One locked pair.

    ``changed`` lists (clause, what) of rules known to differ from A23.3-14 whose new text must be
    confirmed by the office in its own copy before they are relied on; ``changed_beyond`` those of
    shear, anchorage, deflection, partitions and reduced load, which not every calculation uses.
    """

    name: str
    building: str
    concrete: str
    changed: tuple[tuple[str, str], ...] = ()
    changed_beyond: tuple[tuple[str, str], ...] = ()


_DUCTILITY = ("10.5.2", "limit of c/d: changed since A23.3-14")
_UNSEEN = (
    ("NBC 4.1.3.2", "load cases: this edition has not been seen"),
    ("NBC 4.1.5.3", "specified live loads: this edition has not been seen"),
    ("10.1.7", "stress block: assumed unchanged"),
)
_SHEAR = ("11.3", "shear: simplified and general method updated since A23.3-14")
_BEYOND_LOADS = (
    ("NBC 4.1.3.4", "load cases of deflections: this edition has not been seen"),
    ("NBC 4.1.4.1", "allowance for partitions: this edition has not been seen"),
    ("NBC 4.1.5.8", "live load reduction by area: this edition has not been seen"),
)
_ANCHORAGE = (
    ("12.2", "development of straight bars: this edition has not been seen"),
    ("12.5", "hooks: a new form, with the bar diameter to the power 1.5"),
)

CODE_PAIRS = {
    pair.name: pair
    for pair in (
        CodePair("NBC 2015 + A23.3-14", "NBC 2015", "CSA A23.3-14"),
        CodePair("NBC 2020 + A23.3:19", "NBC 2020", "CSA A23.3:19", (_DUCTILITY,), (_SHEAR,)),
        CodePair(
            "NBC 2025 + A23.3:24",
            "NBC 2025",
            "CSA A23.3:24",
            (_DUCTILITY, *_UNSEEN),
            (*_BEYOND_LOADS, _SHEAR, *_ANCHORAGE),
        ),
    )
}


def code_pair(name: object) -> CodePair:
    """Return the locked pair of that name; any other mix is refused, and there is no default."""
    tidy = " ".join(str(name).split())
    found = CODE_PAIRS.get(tidy)
    if found is None:
        pairs = "; ".join(repr(pair) for pair in CODE_PAIRS)
        raise UserError(f"codes.pair: {echo(name)} is not a locked code pair; write one of {pairs}")
    return found
