"""Formulas and criteria: written once, as text, as the standard prints them."""

from __future__ import annotations

from collections.abc import Callable, Mapping
from dataclasses import dataclass, field
from functools import cached_property
from typing import Any, Literal

from lineproof.errors import UserError
from lineproof.formula.compiled import COMPARE, compile_step, compile_tree
from lineproof.formula.grammar import parse_criterion, parse_line
from lineproof.formula.notation import Notation
from lineproof.formula.tree import Name, Tree, names_of
from lineproof.quantity.units import unit_named

System = Literal["N-mm", "kN-m"]
FROM_MEMORY = "from memory"
COMMON_PRACTICE = "common practice"
EMPTY = Notation(())


@dataclass(frozen=True, eq=False)
class Formula:
    """A formula of the catalogue or of a designer.

    ``symbol`` is what it gives, printed in ``unit``; ``names`` its arguments in order of
    appearance; ``numbers`` the units of an empirical formula's constants; ``system`` the units in
    which the substitution is printed. The function takes and gives internal units (N, mm, MPa).
    """

    text: str
    symbol: str
    tree: Tree = field(repr=False)
    names: tuple[str, ...] = field(repr=False)
    unit: str
    clause: str = ""
    title: str = ""
    basis: str = ""
    numbers: Mapping[str, str] = field(default_factory=dict, repr=False)
    system: System = "N-mm"
    notation: Notation = field(default=EMPTY, repr=False)

    @cached_property
    def function(self) -> Callable[..., float]:
        """The compiled function of positional floats, in the order of ``names``."""
        return compile_tree(self.tree, self.names)

    def at(self, values: Mapping[str, float]) -> float:
        """Return what the formula gives at values by name, all in internal units.

        >>> formula("a = b + c", unit="mm").at({"b": 1.0, "c": 2.0, "d": 3.0})
        3.0
        """
        return self.function(*[values[name] for name in self.names])

    @cached_property
    def step(self) -> Callable[[dict[str, Any]], Any]:
        """The compiled function of a scope of entries, giving ``(arguments, value)``."""
        return compile_step(self.tree, self.names)


@dataclass(frozen=True, eq=False)
class Criterion:
    """One comparison, for a decision or a check.

    ``yes`` and ``no`` are the concluding sentences; both sides are printed in ``unit``. A
    ``proof`` shows the calculation right, not the member sufficient.
    """

    text: str
    left: Tree = field(repr=False)
    sign: str
    right: Tree = field(repr=False)
    names: tuple[str, ...] = field(repr=False)
    unit: str
    clause: str = ""
    title: str = ""
    basis: str = ""
    yes: str = ""
    no: str = ""
    key: str = ""
    numbers: Mapping[str, str] = field(default_factory=dict, repr=False)
    system: System = "N-mm"
    notation: Notation = field(default=EMPTY, repr=False)
    proof: bool = False

    @cached_property
    def functions(self) -> tuple[Callable[..., float], Callable[..., float]]:
        """The compiled sides, each a function of all ``names``."""
        return compile_tree(self.left, self.names), compile_tree(self.right, self.names)

    def sides(self, values: Mapping[str, float]) -> tuple[float, float]:
        """Return the left and the right side at values by name, all in internal units."""
        given = [values[name] for name in self.names]
        left, right = self.functions
        return left(*given), right(*given)

    def holds(self, left: float, right: float) -> bool:
        """Tell whether the comparison is true."""
        return COMPARE[self.sign](left, right)


def formula(
    text: str,
    *,
    unit: str | None = None,
    clause: str = "",
    title: str = "",
    basis: str = "",
    numbers: Mapping[str, str] | None = None,
    system: System = "N-mm",
    notation: Notation = EMPTY,
) -> Formula:
    """Declare a formula; ``unit`` defaults to that of its symbol in the notation.

    >>> formula("a = phi_s*A_s*f_y/(alpha_1*phi_c*f_c*b)", unit="mm").names[:2]
    ('phi_s', 'A_s')
    """
    symbol, tree = parse_line(text)
    if unit is None:
        if symbol not in notation:
            raise UserError(
                f"{symbol}: say in which unit it is printed: unit='kN.m' (unit='' for a number)"
            )
        unit = notation[symbol].unit
    return Formula(
        text, symbol, tree, names_of(tree), unit_named(unit).spelling, clause, title, basis,
        dict(numbers or {}), system, notation,
    )  # fmt: skip


def criterion(
    text: str,
    *,
    unit: str | None = None,
    clause: str = "",
    title: str = "",
    basis: str = "",
    yes: str = "",
    no: str = "",
    key: str = "",
    numbers: Mapping[str, str] | None = None,
    system: System = "N-mm",
    notation: Notation = EMPTY,
    proof: bool = False,
) -> Criterion:
    """Declare a criterion with its one comparison; ``key`` names it in ids.

    ``unit`` defaults to that of a side that is a bare symbol of the notation.

    >>> criterion("M_f <= M_r", unit="kN.m").sign
    '<='
    """
    left, sign, right = parse_criterion(text)
    names = tuple(dict.fromkeys((*names_of(left), *names_of(right))))
    if unit is None:
        unit = _unit_of_side(left, right, notation)
    return Criterion(
        text, left, sign, right, names, unit_named(unit).spelling, clause, title, basis, yes, no,
        key or _slug(text), dict(numbers or {}), system, notation, proof,
    )  # fmt: skip


def _unit_of_side(left: Tree, right: Tree, notation: Notation) -> str:
    for side in (left, right):
        if isinstance(side, Name) and side.id in notation:
            return notation[side.id].unit
    return ""


def _slug(text: str) -> str:
    words = {"<=": "_at_most_", ">=": "_at_least_", "<": "_below_", ">": "_above_"}
    for sign, word in words.items():
        if sign in text:
            text = text.replace(sign, word)
            break
    tidy = "".join(ch if ch.isalnum() else "_" for ch in text)
    return "_".join(piece for piece in tidy.split("_") if piece)[:60]
