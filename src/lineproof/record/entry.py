"""Entries and parts: what a calculation records while it is being made."""

from __future__ import annotations

import hashlib
from collections.abc import Iterable
from typing import Any, NoReturn

from lineproof.quantity.units import UNITS, internal_factor, registry

DIGEST_LENGTH = 16

GIVEN, LOOKUP, LINE, FOUND = "given", "lookup", "line", "found"
DECISION, CHECK = "decision", "check"
FIGURE, NOTE, TABLE = "figure", "note", "table"
VALUES = (GIVEN, LOOKUP, LINE, FOUND)
CRITERIA = (DECISION, CHECK)


def digest_of(*pieces: str) -> str:
    """Hash pieces of text; no computed number may enter, since an ulp differs by processor."""
    # A lone surrogate is refused with a sentence when the record closes, not here.
    text = "\x1f".join(pieces).encode("utf-8", "surrogatepass")
    return hashlib.sha256(text).hexdigest()[:DIGEST_LENGTH]


class Part:
    """A titled part of a calculation and the entries made in it, by symbol, in order."""

    __slots__ = ("entries", "key", "title")

    def __init__(self, key: str, title: str) -> None:
        self.key, self.title = key, title
        self.entries: dict[str, Entry] = {}


class Entry:
    """One recorded step.

    ``source`` is what it was made from (formula, criterion, typed given, ...), ``args`` the
    entries it rests on, ``value`` a float in internal units (a pair of floats for a decision or a
    check). Entries do no arithmetic and no comparison: ``a <= h_f`` between objects once chose a
    wrong branch without a word; only a decision or a check has a truth.
    """

    __slots__ = ("args", "digest_", "extra", "kind", "part", "source", "symbol", "value")

    digest_: str

    def __init__(
        self,
        part: Part,
        symbol: str,
        kind: str,
        source: Any,
        args: tuple[Entry, ...],
        value: Any,
        extra: dict[str, Any] | None = None,
    ) -> None:
        self.part = part
        self.symbol = symbol
        self.kind = kind
        self.source = source
        self.args = args
        self.value = value
        self.extra = extra

    @property
    def id(self) -> str:
        """The entry's id, ``part-key/symbol``."""
        return f"{self.part.key}/{self.symbol}"

    @property
    def unit(self) -> str:
        """The unit in which the value is printed."""
        if self.extra is not None and "unit" in self.extra:
            return str(self.extra["unit"])
        return str(getattr(self.source, "unit", ""))

    @property
    def digest(self) -> str:
        """Hash of the entry's text and of all that it rests on."""
        waiting = [] if hasattr(self, "digest_") else [self]
        while waiting:  # not by recursion: a calculation may be one long chain
            entry = waiting[-1]
            missing = [arg for arg in entry.args if not hasattr(arg, "digest_")]
            if missing:
                waiting.extend(missing)
            else:
                pieces = entry._pieces()  # noqa: SLF001 - another entry
                names = entry._argument_names()  # noqa: SLF001 - another entry
                on = [f"{n}={a.digest_}" for n, a in zip(names, entry.args, strict=True)]
                # Sorted: a record that was saved by Jupyter comes back with its keys sorted.
                entry.digest_ = digest_of(*pieces, *sorted(on))
                waiting.pop()
        return self.digest_

    def _argument_names(self) -> Iterable[str]:
        """Return what the arguments are called; what only shows calls them nothing."""
        named = self.kind in (LINE, DECISION, CHECK, FOUND)
        return tuple(self.source.names) if named else [""] * len(self.args)

    def _pieces(self) -> Iterable[str]:
        if self.kind in (LINE, DECISION, CHECK):
            return self.kind, self.symbol, self.source.text, self.unit, self.source.clause
        return self.kind, self.symbol, *self.source.digest_pieces()

    @property
    def quantity(self) -> Any:
        """The value as a pint quantity in the printed unit."""
        if self.kind not in VALUES:
            self._no_value()
        ureg = registry()
        number = self.value / internal_factor(self.unit)
        return ureg.Quantity(number, UNITS[self.unit].expression)

    def __bool__(self) -> bool:
        """Tell whether a decision or a check holds; a value has no truth."""
        if self.kind in CRITERIA:
            left, right = self.value
            return bool(self.source.holds(left, right))
        return self._no_value()

    def _no_value(self) -> NoReturn:
        msg = (
            f"{self.id} is a recorded {self.kind}, not a number or a truth; record the comparison: "
            f"sheet.decide('{self.symbol} <= ...'), or read {self.symbol}.quantity"
        )
        raise TypeError(msg)

    def _refuse(self, _: object) -> NoReturn:
        self._no_value()

    __lt__ = __le__ = __gt__ = __ge__ = _refuse
    __add__ = __radd__ = __sub__ = __rsub__ = __mul__ = __rmul__ = _refuse
    __truediv__ = __rtruediv__ = __pow__ = _refuse
    __array_ufunc__ = None

    def __float__(self) -> float:
        """Refuse: a bare float would lose the unit."""
        return self._no_value()

    def __repr__(self) -> str:
        """Show id, value in the printed unit, and kind."""
        if self.kind in VALUES:
            return f"{self.id} = {self.value / internal_factor(self.unit):.6g} {self.unit}".rstrip()
        if self.kind in CRITERIA:
            return f"{self.id}: {'holds' if self else 'does not hold'}"
        return f"{self.id} ({self.kind})"
