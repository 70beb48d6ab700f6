"""Symbols: one id, one meaning, one unit, and the parts from which a symbol is typeset."""

from __future__ import annotations

import keyword
import re
from collections.abc import Iterable, Iterator, Mapping
from dataclasses import dataclass
from functools import lru_cache

from lineproof.errors import UserError

GREEK = {
    "alpha": "α", "beta": "β", "gamma": "γ", "delta": "δ", "epsilon": "ε", "eps": "ε",
    "zeta": "ζ", "eta": "η", "theta": "θ", "kappa": "κ", "lambda": "λ", "mu": "μ", "nu": "ν",
    "xi": "ξ", "pi": "π", "rho": "ρ", "sigma": "σ", "tau": "τ", "phi": "φ", "chi": "χ",
    "psi": "ψ", "omega": "ω", "Gamma": "Γ", "Delta": "Δ", "Theta": "Θ", "Sigma": "Σ",
    "Phi": "Φ", "Psi": "Ψ", "Omega": "Ω",
}  # fmt: skip
MOST_KEPT = 8192
"""Ids that are kept as checked: a symbol stands in many lines."""
_ID = re.compile(r"[A-Za-z][A-Za-z0-9_]{0,39}\Z")


@dataclass(frozen=True, slots=True)
class Symbol:
    """A symbol of a calculation.

    ``base``, ``sub`` and ``sup`` are typeset apart (f, c and a prime make f'c);
    ``unit`` is the unit in which the value is printed, one spelling of the closed list.
    """

    id: str
    base: str
    sub: str = ""
    sup: str = ""
    meaning: str = ""
    unit: str = ""


@lru_cache(maxsize=MOST_KEPT)
def check_id(symbol_id: str) -> str:
    """Return ``symbol_id`` if it can name a symbol, else raise :class:`UserError`."""
    if not _ID.match(symbol_id) or keyword.iskeyword(symbol_id):
        raise UserError(
            f"symbol {symbol_id[:60]!r}: use letters, digits and underscores, starting with a "
            "letter, and no word of Python (write 'lambda_', 'f_c')"
        )
    return symbol_id


def symbol_from_id(symbol_id: str, meaning: str = "", unit: str = "") -> Symbol:
    """Derive the typeset parts from an id: ``gamma_c`` gives γ with subscript c.

    >>> symbol_from_id("w_cb").sub, symbol_from_id("phi_s").base, symbol_from_id("l_av").base
    ('cb', 'φ', 'ℓ')
    """
    check_id(symbol_id)
    base, _, rest = symbol_id.strip("_").partition("_")
    sub = ",".join(GREEK.get(piece, piece) for piece in rest.split("_") if piece)
    base = "ℓ" if base == "l" else GREEK.get(base, base)  # a length, told apart from one
    return Symbol(symbol_id, base, sub, "", meaning, unit)


class Notation(Mapping[str, Symbol]):
    """The symbols of one standard: an immutable table by id."""

    def __init__(self, symbols: Iterable[Symbol]) -> None:
        table: dict[str, Symbol] = {}
        for symbol in symbols:
            check_id(symbol.id)
            if symbol.id in table:
                msg = f"symbol {symbol.id!r} stands twice in the notation"
                raise ValueError(msg)
            table[symbol.id] = symbol
        self._table = table

    def __getitem__(self, symbol_id: str) -> Symbol:
        return self._table[symbol_id]

    def __iter__(self) -> Iterator[str]:
        return iter(self._table)

    def __len__(self) -> int:
        return len(self._table)

    def __hash__(self) -> int:
        """Hash the content, since equal tables are equal."""
        return hash(frozenset(self._table.values()))

    def __or__(self, other: Notation) -> Notation:
        """Join two tables; a symbol may stand in both only with the same meaning and unit."""
        extra = [s for i, s in other.items() if self._table.get(i) != s]
        return Notation([*self._table.values(), *extra])
