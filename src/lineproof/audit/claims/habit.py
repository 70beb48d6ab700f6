"""How the author of a sheet rounds: a coarse number is his habit, or the only one of its kind.

Who writes every moment to 10 kN.m wrote this one so too; a slip that moves it by less than that
moves nothing that he writes down. A coarse number among others that were worked to the digit asks
for a reason.
"""

from __future__ import annotations

from collections.abc import Callable, Iterable, Sequence
from dataclasses import dataclass
from decimal import Decimal

from lineproof.audit.claims.readings import Rounded, coarse_roundings, is_set_out, last_digit
from lineproof.audit.claims.worlds import Worlds
from lineproof.audit.data import Claim
from lineproof.audit.graph import Graph, Node
from lineproof.audit.slips.scope import stem
from lineproof.quantity.units import UNITS, internal_factor

HABIT = 2
"""So many other quantities that are rounded so make a habit; one may be a chance."""
_LEAST_MOVED = 0.1
"""Part of a step by which a number must be moved to tell of it: 998 made 1000 tells of no 100."""
_BUILT_ROUND = (10, 25)
"""Millimetres of which a length on a drawing is a multiple, however its designer rounds."""


@dataclass(frozen=True, slots=True)
class Step:
    """A step to which a number is a usual rounding, the digits that it leaves, and how it moves.

    ``digits`` is none for fives or 25; ``moved`` is the part of the step by which it moves.
    """

    width: Decimal
    digits: int | None
    moved: float


@dataclass(frozen=True, slots=True)
class Number:
    """A number of a sheet: its quantity, unit and part, as typed, and how it may be rounded.

    It has no ``steps`` if its digits are those of what follows, or if it is no rounding. ``up``
    tells that it was rounded up, ``built`` that it is a length, round because it is built so.
    """

    id: str
    quantity: str
    unit: str
    part: str
    typed: Decimal
    steps: tuple[Step, ...]
    up: bool
    built: bool


@dataclass(frozen=True, slots=True)
class Habit:
    """A way of rounding: to a step of the unit, to so many digits, or by cutting digits off.

    Without ``digits`` its step is no digit: fives.
    """

    step: Decimal | None
    digits: int | None
    cut: bool

    def fits(self, step: Step) -> bool:
        """Tell whether a rounding to a step is one of these."""
        return step.width == self.step or (self.digits is not None and step.digits == self.digits)

    def made(self, number: Number) -> bool:
        """Tell whether a number was rounded so."""
        return any(self.fits(step) and step.moved >= _LEAST_MOVED for step in number.steps)

    def broken(self, number: Number) -> bool:
        """Tell whether a number would be another one if it had been rounded so."""
        if self.cut:
            return number.up
        if self.step is not None and number.typed % self.step == 0:
            return False
        return self.digits is None or number.typed % _last_of(number.typed, self.digits) != 0


def numbers_of(graph: Graph, claims: Iterable[Claim], worlds: Worlds) -> tuple[Number, ...]:
    """Return the worked numbers of a sheet; inputs say nothing of how their user rounds."""
    pairs = ((graph[claim.id], claim) for claim in claims)
    return tuple(
        _number(node, claim, worlds)
        for node, claim in pairs
        if node.is_computed and Decimal(claim.typed) != 0
    )


def _number(node: Node, claim: Claim, worlds: Worlds) -> Number:
    around = worlds.around(node)
    follows = any(claim.stands_for.holds(interval.middle) for interval in around)
    read = [] if follows else [r for r in coarse_roundings(claim, node.symbol, around) if r.usual]
    size = round(claim.value)
    return Number(
        id=claim.id,
        quantity=stem(node.symbol),
        unit=claim.unit,
        part=node.part,
        typed=Decimal(claim.typed),
        steps=tuple(_step(claim, each) for each in read),
        up=abs(claim.value) > abs(around[0].middle) and (follows or bool(read)),
        built=is_set_out(claim, node.symbol) and any(size % by == 0 for by in _BUILT_ROUND),
    )


def _step(claim: Claim, rounded: Rounded) -> Step:
    width = Decimal(rounded.step)
    away = abs(claim.value - rounded.of) / internal_factor(claim.unit)
    return Step(width, _digits(_decade(claim, rounded), width), away / float(width))


def others_made(
    numbers: Iterable[Number],
    claim: Claim,
    node: Node,
    rounded: Rounded,
    in_doubt: Callable[[str], bool] = lambda _: False,
) -> int:
    """Return how many other quantities are rounded as a claim may be; 0 if that is no habit.

    It is none where as many are written otherwise though they are as large: who rounds a number
    rounds larger ones too; nor where a finer step is that of more. Numbers of the same unit tell;
    where they tell too little, those of the whole sheet that have as many digits before the point
    do. In the part of the claim no more may be written otherwise than rounded so.

    The same quantity elsewhere does not count: a slip made in every place is no habit. Nor does a
    number that is itself ``in_doubt``, by its id, nor a length that is built round for one that is
    not, nor a size for what is none.
    """
    own, decade = _step(claim, rounded), _decade(claim, rounded)
    least = Decimal(1).scaleb(decade)
    cut = own.width == last_digit(claim)
    built = is_set_out(claim, node.symbol)
    others = [n for n in numbers if n.quantity != stem(node.symbol)]

    def counted(among: Sequence[Number], habit: Habit) -> tuple[int, int]:
        broken = {n.quantity for n in among if abs(n.typed) >= least and habit.broken(n)}
        tells = (n for n in among if habit.made(n) and (built or not n.built))
        made = {n.quantity for n in tells if not in_doubt(n.id)}
        return len(made), len(broken)

    habit = Habit(own.width, own.digits, cut)
    same = [n for n in others if n.unit == claim.unit]
    if _is_finer(same, habit):
        return 0
    made, broken = counted([n for n in same if n.part == node.part], habit)
    if broken > made:
        return 0
    made, broken = counted(same, habit)
    if broken > made:
        return 0
    if made < HABIT and not broken and own.digits is not None:
        alike = [n for n in others if _is_length(n.unit) == _is_length(claim.unit)]
        by_digits, broken = counted(alike, Habit(None, own.digits, cut))
        made = max(made, by_digits)
    return made if made > broken else 0


def _is_finer(numbers: Sequence[Number], habit: Habit) -> bool:
    """Tell whether a finer step than that of a habit is the step of more quantities."""
    finer: dict[Decimal, set[str]] = {}
    own: set[str] = set()
    for number in numbers:
        for step in number.steps:
            if habit.fits(step):
                own.add(number.quantity)
            if habit.step is not None and step.width < habit.step:
                finer.setdefault(step.width, set()).add(number.quantity)
    return any(len(quantities) > len(own) for quantities in finer.values())


def _is_length(unit: str) -> bool:
    return UNITS[unit].kind == "length"


def _decade(claim: Claim, rounded: Rounded) -> int:
    """Return the power of ten of a number before it was rounded, in its unit: 2 for 975 as 1000."""
    smaller = min(abs(claim.value), abs(rounded.of)) / internal_factor(claim.unit)
    return Decimal(smaller * (1 + 1e-9)).adjusted()


def _digits(decade: int, step: Decimal) -> int | None:
    """Return how many digits of a number a step leaves; none for a step of fives or 25."""
    is_digit = step.normalize().as_tuple().digits == (1,)
    return decade - step.adjusted() + 1 if is_digit else None


def _last_of(number: Decimal, digits: int) -> Decimal:
    return Decimal(1).scaleb(number.adjusted() - digits + 1)
