"""How the author of a sheet rounds: a coarse number is his habit, or the only one of its kind.

Who writes every moment to 10 kN.m wrote this one so too; a slip that moves it by less than that
moves nothing that he writes down. A coarse number among others that were worked to the digit asks
for a reason.
"""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass
from decimal import Decimal

from lineproof.audit.claims.readings import coarse_roundings, last_digit
from lineproof.audit.claims.worlds import Worlds
from lineproof.audit.data import Claim
from lineproof.audit.graph import Graph
from lineproof.audit.slips.scope import stem


@dataclass(frozen=True, slots=True)
class Number:
    """A number of a sheet: its quantity, its unit, as typed, and how it may have been rounded.

    ``steps`` are those to which it is a usual rounding; it has none if it follows within its
    digits, which ``follows`` tells. ``up`` tells that it is larger than what follows.
    """

    quantity: str
    unit: str
    typed: Decimal
    steps: tuple[Decimal, ...]
    follows: bool
    up: bool


@dataclass(frozen=True, slots=True)
class Habit:
    """A way of rounding: to a step of the unit, to so many digits, or by cutting digits off.

    Without ``digits`` its step is no digit: fives.
    """

    step: Decimal | None
    digits: int | None
    cut: bool

    def made(self, number: Number) -> bool:
        """Tell whether a number was rounded so."""
        kept = {_digits(number.typed, step) for step in number.steps} - {None}
        return self.step in number.steps or self.digits in kept

    def broken(self, number: Number) -> bool:
        """Tell whether a number would be another one if it had been rounded so."""
        if not number.follows:
            return False
        if self.cut:
            return number.up
        if self.step is not None and number.typed % self.step == 0:
            return False
        return self.digits is None or number.typed % _last_of(number.typed, self.digits) != 0


def numbers_of(graph: Graph, claims: Iterable[Claim], worlds: Worlds) -> tuple[Number, ...]:
    """Return the worked numbers of a sheet; inputs say nothing of how their user rounds."""
    found = []
    for claim in claims:
        node, typed = graph[claim.id], Decimal(claim.typed)
        if not node.is_computed or not typed:
            continue
        around = [w.follows[claim.id].interval for w in (worlds.claimed, worlds.sound)]
        follows = any(claim.stands_for.meets(interval) for interval in around)
        read = () if follows else coarse_roundings(claim, node.symbol, around)
        steps = tuple(Decimal(each.step) for each in read if each.usual)
        up = abs(claim.value) > abs(around[0].middle)
        found.append(Number(stem(node.symbol), claim.unit, typed, steps, follows, up))
    return tuple(found)


def is_habit(numbers: Iterable[Number], claim: Claim, symbol: str, step: str) -> bool:
    """Tell whether a rounding of a claim to a ``step`` of its unit is how its author rounds.

    It is where more of the other quantities are rounded so than are written otherwise though they
    are as large: who rounds a number rounds larger ones too. Those of the same unit tell; where
    they tell nothing, the numbers of the whole sheet that have as many digits before the point do.
    The same quantity elsewhere does not count: a slip made in every place is no habit.
    """
    typed, width = Decimal(claim.typed), Decimal(step)
    digits, cut = _digits(typed, width), width == last_digit(claim)
    others = [n for n in numbers if n.quantity != stem(symbol)]
    same = [n for n in others if n.unit == claim.unit]
    made, broken = _counted(same, Habit(width, digits, cut), abs(typed))
    if not made and not broken and digits is not None:
        made, broken = _counted(
            others, Habit(None, digits, cut), Decimal(1).scaleb(typed.adjusted())
        )
    return made > broken


def _counted(numbers: Iterable[Number], habit: Habit, least: Decimal) -> tuple[int, int]:
    """Return how many quantities are rounded so, and how many as large are written otherwise."""
    made = {n.quantity for n in numbers if habit.made(n)}
    broken = {n.quantity for n in numbers if abs(n.typed) >= least and habit.broken(n)}
    return len(made), len(broken)


def _digits(number: Decimal, step: Decimal) -> int | None:
    """Return how many digits of a number a step leaves; none for a step of fives or 25."""
    is_digit = step.normalize().as_tuple().digits == (1,)
    return number.adjusted() - step.adjusted() + 1 if is_digit else None


def _last_of(number: Decimal, digits: int) -> Decimal:
    return Decimal(1).scaleb(number.adjusted() - digits + 1)
