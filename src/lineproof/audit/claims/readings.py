"""Slips of units and coarse roundings: what a claimed number says beyond its digits."""

from __future__ import annotations

from collections.abc import Iterable, Iterator
from dataclasses import dataclass
from decimal import Decimal

from lineproof.audit.data import Claim, Interval, Slip
from lineproof.audit.slips.scope import stem
from lineproof.quantity.digits import number_text, significant
from lineproof.quantity.units import UNITS, internal_factor, units_of_kind
from lineproof.typeset.values import unit_text

_MOST_POWER = 9
_SHARP = 0.02
"""Half width over value from which an interval is too wide to tell one factor from another."""
_NEAR_ONE = 3.0
"""Factors nearer to one, such as kip.ft for kN.m, are too easily met by chance."""
_DIGIT_LESS = (10,)
"""Steps in units of the last digit that write one digit less: any number is rounded so."""
_BY_HABIT = (5,)
"""Steps to which only a whole sheet is rounded: moments to 5 kN.m."""
_BUILT = (5, 10)
"""Steps for sizes and areas; a size is in whole millimetres, a deflection to a tenth is none."""
_SIZE = 1.0
_LARGE_AREA = 50.0
"""Half a step in mm2 from which an area is rounded as any number: nobody makes it 26 500 so."""
_LAID_OUT = frozenset((
    "s", "s_b", "s_f", "s_tie", "s_max", "s_v", "l", "l_n", "l_d", "l_dh", "l_s", "l_lp", "l_in",
    "l_e", "l_ext", "x_e", "x_co", "b_w", "b_f", "b_o", "b_s", "b_tr", "h", "h_f", "h_min",
))  # fmt: skip
"""Lengths that are set out on a drawing: spacings, lengths of bars and spans, widths, depths.

Not those worked out within a section, such as d, a, c, d_v or s_z: nobody rounds them to 25 mm.
"""
_SET_OUT = (5, 10, 25, 50, 100)
"""Steps for lengths that are set out on a drawing."""
_HALF = 0.5 + 1e-9
"""The nearest multiple is no farther than half a step."""
_EXACT_DIGITS = 6
_LARGE = 10**6
_NEAR = 0.025
"""Part of a value by which a rounding for once may move it."""
_FARTHEST = 0.05
"""Part of a value by which any rounding may move it: two digits move 105 to 110 or 100."""


def unit_slip(claim: Claim, follows: Iterable[Interval]) -> Slip | None:
    """Return the slip of units that reproduces a claim from what follows, if there is one.

    A number that stands for nothing as well, such as 0, is near any value in a unit large enough.
    """
    if claim.stands_for.holds(0.0):
        return None
    sharp = [i for i in follows if i.middle and i.half <= _SHARP * abs(i.middle)]
    for factor, sentence in _factors(claim):
        scaled = claim.stands_for.times(1 / factor)
        for interval in sharp:
            if scaled.meets(interval):
                return Slip("unit", sentence, interval.middle * factor, 1.0)
    return None


def _factors(claim: Claim) -> Iterator[tuple[float, str]]:
    """Give claimed over right value for every slip of unit, units of the list first."""
    mine = internal_factor(claim.unit)
    kind = UNITS[claim.unit].kind
    for other in units_of_kind(kind):
        factor = mine / internal_factor(other)
        if not 1 / _NEAR_ONE < factor < _NEAR_ONE:
            given, right = unit_text(claim.unit), unit_text(other)
            yield factor, f"reproduced exactly with {given} in place of {right}"
    for power in range(1, _MOST_POWER + 1):
        yield 10.0**power, f"reproduced exactly {10**power:,} times too large".replace(",", " ")
        yield 10.0**-power, f"reproduced exactly {10**power:,} times too small".replace(",", " ")


@dataclass(frozen=True, slots=True)
class Rounded:
    """A claim that may be a rounding: of what, to which step in its unit, up or down.

    ``usual`` tells the nearest multiple, and digits cut off behind the last one; another multiple
    is taken by nobody but to be on the safe side. ``alone`` tells that it may be a rounding even
    where no other number of the sheet is rounded so: it moves the value little, and has fewer
    digits. ``is_coarse`` tells that it has a digit less than it shows, or was built so: no
    rounding of a line between gives it.
    """

    of: float
    step: str
    up: bool
    usual: bool
    alone: bool
    is_coarse: bool


def coarse_roundings(claim: Claim, symbol: str, follows: Iterable[Interval]) -> Iterator[Rounded]:
    """Give how a claim may round what follows, coarser than its digits say.

    One unit of the last digit in either direction counts for every number; ten of it, which write
    one digit less; and what lengths and areas are rounded to as built. A zero written last behind
    the point says that the digit before it was worked out: 62.0 is no rounding of 61.1 to 62.
    """
    number = Decimal(claim.typed)
    unit = last_digit(claim)
    usual_steps = _steps(claim, symbol)
    by_habit = () if not usual_steps else tuple(c for c in _BY_HABIT if c not in usual_steps)
    for interval in follows:
        of = interval.middle
        away = abs(claim.value - of)
        if not of or away > _FARTHEST * abs(of):
            continue
        alone = away <= _NEAR * abs(of) and _is_simpler(number, of, claim.unit)
        for count in (1, *usual_steps, *by_habit):
            step = unit * count
            far = away / (float(step) * internal_factor(claim.unit))
            if number % step == 0 and far < 1:
                up = abs(claim.value) > abs(of)
                usual = far <= _HALF or (count == 1 and not up)
                alone_too = alone and count not in by_habit
                yield Rounded(of, _plain(step), up, usual, alone_too, is_coarse=count > 1)


def _steps(claim: Claim, symbol: str) -> tuple[int, ...]:
    """Return the steps in units of the last digit that a claim may be rounded to beside one."""
    digits = claim.typed.lower().partition("e")[0]
    if "." in digits and digits.endswith("0"):
        return ()
    if is_set_out(claim, symbol):
        return _SET_OUT
    is_area = UNITS[claim.unit].kind == "area" and claim.stands_for.half < _LARGE_AREA
    return _BUILT if _is_size(claim) or is_area else _DIGIT_LESS


def is_set_out(claim: Claim, symbol: str) -> bool:
    """Tell whether a claim is a length that is set out on a drawing, in whole millimetres."""
    return _is_size(claim) and stem(symbol) in _LAID_OUT


def _is_size(claim: Claim) -> bool:
    is_length = UNITS[claim.unit].kind == "length"
    return is_length and 2 * claim.stands_for.half >= _SIZE * (1 - 1e-9)


def _plain(step: Decimal) -> str:
    return f"{step.normalize():f}" if step < _LARGE else number_text(step.normalize())


def _is_simpler(number: Decimal, of: float, unit: str) -> bool:
    """Tell whether a number has fewer digits than what it rounds: 2650 is no rounding of 2620."""
    exact = significant(of / internal_factor(unit), _EXACT_DIGITS).normalize()
    return len(number.normalize().as_tuple().digits) < len(exact.as_tuple().digits)


def last_digit(claim: Claim) -> Decimal:
    """Return one unit of the last digit that a claim shows, in its unit."""
    half = claim.stands_for.half / internal_factor(claim.unit)
    return Decimal(1).scaleb(Decimal(2 * half * (1 + 1e-9)).adjusted())
