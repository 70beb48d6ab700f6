"""What an entry was made from, when it is not a formula or a criterion: plain data."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field
from typing import Any

from lineproof.formula import Criterion, Symbol
from lineproof.quantity import Typed
from lineproof.record.procedures import Procedure


@dataclass(frozen=True, slots=True)
class GivenSource:
    """A value that the designer typed."""

    symbol: Symbol
    typed: Typed
    unit: str
    title: str = ""
    origin: str = ""
    clause: str = ""
    basis: str = ""

    def digest_pieces(self) -> tuple[str, ...]:
        """Return the typed text; it counts, not the float made of it."""
        return (self.typed.text, self.unit)


@dataclass(frozen=True, slots=True)
class LookupSource:
    """A value read from a table."""

    symbol: Symbol
    table: str
    row: str
    typed: Typed
    unit: str
    title: str = ""
    origin: str = ""
    clause: str = ""
    basis: str = ""

    def digest_pieces(self) -> tuple[str, ...]:
        """Return table, row and the number read."""
        return (self.table, self.row, self.typed.number, self.unit)


@dataclass(frozen=True, slots=True)
class FoundSource:
    """A value found by a registered procedure, with the criterion by which it is confirmed.

    ``names`` are what the procedure calls the entries that the value rests on, in their order.
    """

    symbol: Symbol
    procedure: Procedure
    names: tuple[str, ...]
    settings: Mapping[str, float]
    unit: str
    closing: Criterion
    title: str = ""
    clause: str = ""
    basis: str = ""

    def digest_pieces(self) -> tuple[str, ...]:
        """Return procedure, version, settings and closing criterion; never the value."""
        settings = [f"{k}={v!r}" for k, v in sorted(self.settings.items())]
        return (
            self.procedure.name,
            str(self.procedure.version),
            *settings,
            self.closing.text,
        )


@dataclass(frozen=True, slots=True)
class ShownSource:
    """A figure, a table or a note: what is shown, with the text that stands for it."""

    title: str
    text: str
    content: Mapping[str, Any] = field(default_factory=dict)
    clause: str = ""
    basis: str = ""

    def digest_pieces(self) -> tuple[str, ...]:
        """Return title and text; the shapes follow from the entries the figure rests on."""
        return (self.title, self.text)
