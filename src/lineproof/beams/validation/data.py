"""The published cases, read from the data file beside this module."""

from __future__ import annotations

import tomllib
from collections.abc import Mapping
from dataclasses import dataclass
from decimal import Decimal
from functools import cache
from pathlib import Path
from typing import Any

from lineproof.quantity.digits import with_minus

FILE = Path(__file__).with_name("cases.toml")
BASES = ("text opened", "text opened, loads inferred", "from memory", "own evaluation")
"""How far a published value can be trusted; only the first is evidence of its own."""
_RAISED = str.maketrans("0123456789", "⁰¹²³⁴⁵⁶⁷⁸⁹")
_UNITS = str.maketrans(".24", "·²⁴")
HALF_UNIT = "half a unit of its last digit"


@dataclass(frozen=True, slots=True)
class Published:
    """One published value: ``printed`` as typed with its unit, and how near it must be met.

    ``within`` is the tolerance typed with the same unit, ``why`` its reason.
    """

    printed: str
    within: str
    why: str

    @property
    def number(self) -> str:
        """The number without its unit."""
        return self.printed.partition(" ")[0]

    @property
    def unit(self) -> str:
        """The unit as typed."""
        return self.printed.partition(" ")[2]

    @property
    def shown(self) -> str:
        """The value as it stands in a table."""
        return shown(self.number, self.unit)

    @property
    def share(self) -> Decimal:
        """The tolerance over the published value."""
        return Decimal(self.within.partition(" ")[0]) / abs(Decimal(self.number))


@dataclass(frozen=True, slots=True)
class Case:
    """One published case: what it gives and what it publishes, each typed, by symbol.

    ``short`` stands for the source in tables.
    """

    id: str
    short: str
    title: str
    code: str
    source: str
    basis: str
    note: str
    given: Mapping[str, str]
    published: Mapping[str, Published]

    @property
    def key(self) -> str:
        """The key of its part."""
        return f"case-{self.id.lower()}"


@cache
def cases() -> Mapping[str, Case]:
    """Return every published case by its id, in the order of the file."""
    with FILE.open("rb") as stream:
        data = tomllib.load(stream)
    return {name: _case(name, facts) for name, facts in data.items()}


def _case(name: str, facts: Mapping[str, Any]) -> Case:
    return Case(
        name, facts["short"], facts["title"], facts["code"], facts["source"], facts["basis"],
        facts.get("note", ""), facts["given"],
        {symbol: _published(entry) for symbol, entry in facts["published"].items()},
    )  # fmt: skip


def _published(entry: str | list[str]) -> Published:
    if isinstance(entry, list):
        return Published(*entry)
    number, _, unit = entry.partition(" ")
    return Published(entry, f"{half_unit(number)} {unit}".strip(), HALF_UNIT)


def shown(number: str, unit: str) -> str:
    """Return a printed number and its unit as a table shows them.

    >>> shown("-56.25", "kN.m"), shown("7.2e9", "mm4")
    ('−56.25 kN·m', '7.2 × 10⁹ mm⁴')
    """
    digits, _, power = with_minus(number).partition("e")
    raised = f" × 10{power.translate(_RAISED)}" if power else ""
    return f"{digits}{raised} {unit.translate(_UNITS)}".strip()


def half_unit(number: str) -> Decimal:
    """Return half a unit of the last printed digit.

    >>> half_unit("3.48"), half_unit("539"), half_unit("7.2e9")
    (Decimal('0.005'), Decimal('0.5'), Decimal('5E+7'))
    """
    return Decimal(5).scaleb(int(Decimal(number).as_tuple().exponent) - 1)
