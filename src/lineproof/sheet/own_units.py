"""Units of what a designer records: of the right kind, or read off the typed text."""

from __future__ import annotations

from lineproof.errors import UserError
from lineproof.formula import Notation
from lineproof.quantity import UNITS, unit_named
from lineproof.quantity.feet import one_unit
from lineproof.quantity.units import plain_spelling, units_of_kind


def unit_of_kind(name: str, unit: str, wanted: str) -> str:
    """Return the spelling of a printed unit; refuse one of another kind than ``wanted``."""
    found, kind = unit_named(unit), unit_named(wanted).kind
    if found.kind != kind:
        raise UserError(
            f"{name}: {unit!r} is a unit of {found.kind}, but a {kind} is printed; "
            f"write {', '.join(repr(u) for u in units_of_kind(kind)[:6])}"
        )
    return found.spelling


def keep_to(notation: Notation, name: str, unit: str) -> None:
    """Hold to one symbol, one unit: refuse a unit of another kind than the notation gives."""
    if name in notation:
        unit_of_kind(name, unit, notation[name].unit)


def typed_unit(symbol: str, typed: object) -> str:
    """Take the unit from the text itself, for a symbol that no notation knows."""
    if isinstance(typed, str):
        tail = plain_spelling(one_unit(typed.strip()).lstrip("+-0123456789.eE"))
        if tail in UNITS:
            return tail
    if isinstance(typed, str | int | float):
        return ""
    raise UserError(f"{symbol}: name the unit to print it in: unit='mm'")
