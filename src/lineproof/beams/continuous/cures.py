"""What would cure a failing check: the nearest value that can be built with which it holds.

A check is a utilisation as a function of changed values: it holds up to 1. For every value that may
be changed alone, the nearest one that can be built is sought and told only after the check has been
computed again with it. ``cures_checks`` gives the utilisations of common checks.
"""

from __future__ import annotations

import math
from collections.abc import Callable, Mapping, Sequence
from dataclasses import dataclass
from string import ascii_lowercase

from lineproof.errors import UserError
from lineproof.formula import Criterion
from lineproof.formula.compiled import ROUND_OFF
from lineproof.record.printing import ratio
from lineproof.sentences import begun
from lineproof.standards.a23_3.bars import BARS

Utilisation = Callable[[Mapping[str, float]], float]
"""Left over right side of a check with some values changed (N, mm, MPa); it holds up to 1.

What cannot be computed with them may raise ``UserError``, ``ArithmeticError`` or ``ValueError``.
"""
WIDEST_STIRRUPS, CLOSEST_STIRRUPS = 625.0, 75.0
"""Spacings between which stirrups are sought [mm]; 600 is the widest there may be."""
MOST_STEEL = 6000.0
"""Area of bars up to which at least steel is sought [mm2]."""
MORE = "or more"
"""Said of values beyond the nearest that do as well."""
_COARSE = 16
_LATER = 12
_NOT_COMPUTED = (UserError, ArithmeticError, ValueError)


@dataclass(frozen=True, slots=True)
class Variable:
    """A value that may be changed: what can be built, from the nearest to the farthest.

    ``words`` tells a value ("a depth of {} mm"), ``beyond`` those farther on ("or more"; empty
    where nothing is told of them), ``none`` that none of them would do. ``bar`` is a bar size:
    areas are told with the number of bars.
    """

    values: tuple[float, ...]
    words: str
    beyond: str
    none: str
    bar: str = ""

    def text(self, value: float, *, all_beyond: bool, up_to: float | None = None) -> str:
        """Return a value in words; ``up_to`` is the last beyond that does, where not all do."""
        told = self.words.format(f"{value:.10g}")
        told += f" {self.beyond}" if all_beyond else ""
        told = f"{told} ({self.bars(value)}-{self.bar})" if self.bar else told
        return told if up_to is None else f"{told} or more, up to {up_to:.10g} mm²"

    def bars(self, area: float) -> int:
        """Return the number of bars for an area."""
        return math.ceil(area / BARS.number(self.bar, "A_b") - ROUND_OFF)


@dataclass(frozen=True, slots=True)
class Cure:
    """One cure: what is changed, its value (None: none would do), words, utilisation with it."""

    symbol: str
    value: float | None
    text: str
    utilisation: float | None = None


def up(given: float, limit: float, step: float) -> tuple[float, ...]:
    """Return the multiples of a step above the given value, up to the limit.

    >>> up(620, 650, 10)
    (630, 640, 650)
    """
    first, last = math.floor(given / step + ROUND_OFF) + 1, math.floor(limit / step + ROUND_OFF)
    return tuple(i * step for i in range(first, last + 1))


def down(given: float, limit: float, step: float) -> tuple[float, ...]:
    """Return the multiples of a step below the given value, down to the limit.

    >>> down(310, 250, 25)
    (300, 275, 250)
    """
    first, last = math.ceil(given / step - ROUND_OFF) - 1, math.ceil(limit / step - ROUND_OFF)
    return tuple(i * step for i in range(first, last - 1, -1))


def depth(h: float, limit: float = 3000) -> Variable:
    """Return the overall depth, in steps of 10 mm."""
    none = f"no depth up to {limit:g} mm"
    return Variable(up(h, limit, 10), "a depth of {} mm", MORE, none)


def width(b_w: float, limit: float = 1500) -> Variable:
    """Return the width of the web, in steps of 10 mm."""
    none = f"no width of the web up to {limit:g} mm"
    return Variable(up(b_w, limit, 10), "a web {} mm wide", MORE, none)


def concrete(f_c: float, limit: float = 80) -> Variable:
    """Return the strength of the concrete, in steps of 5 MPa up to what the standard covers."""
    none = f"no concrete up to {limit:g} MPa"
    return Variable(up(f_c, limit, 5), "concrete of {} MPa", MORE, none)


def steel(A_s: float, size: str, limit: float | None = None) -> Variable:
    """Return the area of the bars, told to 10 mm2 with whole bars of their size."""
    most = 4 * A_s if limit is None else limit
    none = f"no area of bars up to {most:.0f} mm²"
    return Variable(up(A_s, most, 10), "{} mm² of bars", MORE, none, size)


def longer(room: float, bars: str, more: str = "") -> Variable:
    """Return by how much bars are made longer [mm], in steps of 50 mm up to the room there is."""
    none = f"no greater length of {bars}"
    return Variable(up(0, room, 50), f"{bars} made {{}} mm longer{more}", MORE, none)


def less_steel(A_s: float, size: str) -> Variable:
    """Return fewer bars of their size; the area stands for them."""
    A_b = BARS.number(size, "A_b")
    return Variable(
        down(A_s, A_b, A_b), "{} mm² of bars", "or less", "no smaller area of bars", size
    )


def spacing(s: float, limit: float = CLOSEST_STIRRUPS) -> Variable:
    """Return the spacing of the stirrups, in steps of 25 mm."""
    none = f"no spacing of the stirrups down to {limit:g} mm"
    return Variable(down(s, limit, 25), "stirrups at {} mm", "or less", none)


def slab_spacing(s_f: float, limit: float = 100) -> Variable:
    """Return the spacing of the slab bars across the web, in steps of 25 mm."""
    none = f"no spacing of the slab bars down to {limit:g} mm"
    words = "these slab bars across the web at {} mm"
    return Variable(down(s_f, limit, 25), words, "or less", none)


def bar_count(number: int, limit: int = 20) -> Variable:
    """Return the number of bars of their size beside each other."""
    none = f"no number of bars up to {limit}"
    return Variable(up(number, limit, 1), "{} bars of this size", MORE, none)


def bar_size(size: str) -> Variable:
    """Return smaller bars of the same total area; the value is the diameter."""
    diameters = [BARS.number(name, "d_b") for name in BARS.rows]
    smaller = sorted((d for d in diameters if d < BARS.number(size, "d_b")), reverse=True)
    words = "bars of diameter {} mm"
    return Variable(tuple(smaller), words, "or less", "no smaller bars of the same area")


def cures(utilisation: Utilisation, variables: Mapping[str, Variable]) -> tuple[Cure, ...]:
    """Return for every variable the nearest value with which the check holds, or that none does.

    A value is told only if the check computed with it holds; an area of bars also if it holds with
    the whole bars told beside it. "or more" is told only where samples of all farther values hold.
    """
    return tuple(_cure(utilisation, symbol, each) for symbol, each in variables.items())


def told(found: Sequence[Cure]) -> str:
    """Return the cures in words, several lettered, each alone; then what would not do.

    >>> told([Cure("h", 670.0, "a depth of 670 mm or more", 0.99),
    ...       Cure("f_c", None, "no concrete up to 80 MPa")])
    'It would hold with a depth of 670 mm or more, all else and the loads, self weight too, as \
they are. No concrete up to 80 MPa would do.'
    """
    able = [cure.text for cure in found if cure.value is not None]
    unable = [cure.text for cure in found if cure.value is None]
    none = f"{begun(_joined(unable))} would do" if unable else ""
    if not able:
        return f"{none} alone." if none else ""
    others = "all else and the loads, self weight too, as they are"
    said = f"It would hold with {able[0]}, {others}."
    if len(able) > 1:
        said = f"It would hold with any one of these alone, {others}: {lettered(able)}."
    return f"{said} {none}." if none else said


def lettered(texts: Sequence[str]) -> str:
    """Return several texts in one, each with its letter; a single one as it is.

    >>> lettered(["a depth of 670 mm", "a web 400 mm wide"])
    '(a) a depth of 670 mm; (b) a web 400 mm wide'
    """
    if len(texts) == 1:
        return texts[0]
    return "; ".join(f"({ascii_lowercase[i]}) {text}" for i, text in enumerate(texts))


def _joined(texts: Sequence[str]) -> str:
    if len(texts) == 1:
        return texts[0]
    return f"{', '.join(texts[:-1])} and {texts[-1]}"


def _cure(utilisation: Utilisation, symbol: str, variable: Variable) -> Cure:
    def used(value: float) -> float:
        try:
            made = utilisation({symbol: value})
        except _NOT_COMPUTED:
            return math.inf
        return made if made == made else math.inf  # noqa: PLR0124 - not a number

    def does(value: float) -> bool:
        if not holds(used(value)):
            return False
        if not variable.bar:
            return True
        return holds(used(variable.bars(value) * BARS.number(variable.bar, "A_b")))

    place = _nearest(does, variable.values)
    if place is None:
        return Cure(symbol, None, variable.none)
    value, later = variable.values[place], variable.values[place + 1 :]
    samples = later[:: max(1, len(later) // _LATER)]
    beyond = bool(variable.beyond) and all(holds(used(x)) for x in (*samples, *later[-1:]))
    up_to = None if beyond or variable.beyond != MORE else _up_to(used, variable, later)
    return Cure(symbol, value, variable.text(value, all_beyond=beyond, up_to=up_to), used(value))


def _up_to(
    used: Callable[[float], float], variable: Variable, later: Sequence[float]
) -> float | None:
    """Return up to which area of bars a check holds, from the least that does; None for no more.

    Found by halving, told only where samples between hold as well.
    """
    if not variable.bar or not later or not holds(used(later[0])):
        return None
    low, high = 0, len(later) - 1
    while high - low > 1:
        middle = (low + high) // 2
        low, high = (middle, high) if holds(used(later[middle])) else (low, middle)
    between = later[: low + 1 : max(1, low // _LATER)]
    return later[low] if all(holds(used(x)) for x in between) else None


def part_used(test: Criterion, left: float, right: float) -> float:
    """Return the utilisation of a check by its sides: 0 where it holds without one, else infinite.

    ``left`` and ``right`` in the internal units of the check.
    """
    made = ratio(test.sign, left, right)
    if made is None:
        return 0.0 if test.holds(left, right) else math.inf
    return made


def holds(utilisation: float) -> bool:
    """Tell whether a utilisation is at most 1, but for the rounding of floats."""
    return utilisation <= 1 + ROUND_OFF


def _nearest(does: Callable[[float], bool], values: Sequence[float]) -> int | None:
    """Return the place of the first value that does: by long steps, then by short ones.

    Where the long steps find none every value is tried, so that "none" is never said too early.
    """
    coarse = next((i for i in range(0, len(values), _COARSE) if does(values[i])), None)
    start, end = (0, len(values)) if coarse is None else (max(0, coarse - _COARSE + 1), coarse + 1)
    return next((i for i in range(start, end) if does(values[i])), None)
