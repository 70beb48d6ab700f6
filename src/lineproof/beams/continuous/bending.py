"""Bent bars: dimensions outside to outside, and the cut length along the centre line [mm].

A shape is a chain of straight parts with bends between. Legs are printed as they are measured on
the bent bar, outside to outside, rounded up to 10 mm where the standard sets a least length; the
cut length follows from the printed legs, is rounded up to 10 mm and can be followed by hand:

    cut = sum of straight parts + sum of bend angles x (r + d_b/2)

A leg between two bends has a straight part of its length less r + d_b at each bend.
"""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass
from typing import Literal

from lineproof.beams.continuous.layout import Hook
from lineproof.errors import UserError
from lineproof.formula import FROM_MEMORY
from lineproof.sheet import LookupTable
from lineproof.standards.a23_3.bars import BARS, STIRRUP_BENDS

STEP = 10.0
"""Hooks and cut lengths are rounded up to this, mm."""
BEND_DIAMETERS = LookupTable(
    "Inside diameter of the bends of bars",
    "Canadian bar",
    {"R": "mm", "W": "mm"},
    {
        "10M": {"R": "70", "W": "60"},
        "15M": {"R": "100", "W": "90"},
        "20M": {"R": "120", "W": "100"},
        "25M": {"R": "150", "W": "150"},
        "30M": {"R": "250", "W": "200"},
        "35M": {"R": "300", "W": "250"},
        "45M": {"R": "450", "W": "400"},
        "55M": {"R": "600", "W": "550"},
    },
    "CSA A23.1, 6.6.2",
    clause="A23.1 6.6.2",
    basis=FROM_MEMORY,
)
BEND_NOTE = (
    "Inside bend diameters and hooks by CSA A23.1, 6.6.2 (from memory). Legs are outside to "
    "outside; a 90° hook of a bar has a tail of 12 bar diameters beyond the bend, a 180° hook "
    "4 diameters, at least 60 mm; hooks of stirrups 6 diameters, at least 60 mm. Cut lengths are "
    "along the centre line. Tails, hooks and cut lengths are rounded up to 10 mm. Shape codes by "
    "ISO 3766 (from memory); a shape without a code is bent as drawn."
)
TAIL_90, TAIL_180, TAIL_STIRRUP, LEAST_TAIL = 12.0, 4.0, 6.0, 60.0
Form = Literal["bar", "open stirrup", "closed stirrup", "single leg", "closed single leg"]
CODES: dict[tuple[float, ...], str] = {(): "00", (90.0,): "11", (90.0, 90.0): "21"}
"""ISO 3766 shape codes by the bends in order; other shapes are drawn and have none."""


def rounded_up(length: float, step: float = STEP) -> float:
    """Round a length up to whole steps; what is whole already stays.

    >>> rounded_up(401.2), rounded_up(400.0000001)
    (410.0, 400.0)
    """
    return math.ceil(length / step - 1e-6) * step


def rounded(value: float, decimals: int) -> float:
    """Round as by hand, a half upward, whatever the last binary digit is.

    >>> rounded(10.7545, 3)
    10.755
    """
    return round(value + 1e-9, decimals)


@dataclass(frozen=True, slots=True)
class BentShape:
    """A bar as bent: the chain of its straight parts and bends, and its printed legs, mm.

    ``legs`` are letter and length in the order of the bar. ``straights`` stand between ``bends``
    (degrees, one fewer), measured from bend to bend.
    """

    form: Form
    size: str
    radius: float
    legs: tuple[tuple[str, float], ...]
    straights: tuple[float, ...]
    bends: tuple[float, ...]

    @property
    def diameter(self) -> float:
        """Bar diameter [mm]."""
        return BARS.number(self.size, "d_b")

    @property
    def centre_line(self) -> float:
        """Length along the centre line, before it is rounded [mm]."""
        arc = math.radians(sum(self.bends)) * (self.radius + self.diameter / 2)
        return sum(self.straights) + arc

    @property
    def cut(self) -> float:
        """Cut length: the centre line rounded up to 10 mm."""
        return rounded_up(self.centre_line)

    @property
    def mass(self) -> float:
        """Mass of one bar of the cut length [kg], nominal area at 7850 kg/m3, to 0.001 kg."""
        return rounded(self.cut * BARS.number(self.size, "A_b") * STEEL_DENSITY, 3)

    @property
    def code(self) -> str:
        """Shape code by ISO 3766, empty where the shape is given by its drawing."""
        return CODES.get(self.bends, "")

    @property
    def legs_text(self) -> str:
        """The legs as printed in a schedule: ``A 410, B 7800``; empty for a straight bar."""
        if not self.bends:
            return ""
        return ", ".join(f"{letter} {length:.0f}" for letter, length in self.legs)

    @property
    def words(self) -> str:
        """The shape in words."""
        if self.form != "bar":
            return self.form
        hooks = [f"{bend:.0f}°" for bend in self.bends]
        if not hooks:
            return "straight"
        if len(hooks) == 1:
            return f"{hooks[0]} hook at one end"
        return f"hooks {hooks[0]} and {hooks[1]}" if len({*hooks}) > 1 else f"{hooks[0]} hooks"


STEEL_DENSITY = 7850e-9
"""kg/mm3: the nominal mass of a bar is its nominal area at 7850 kg/m3."""


def bend_radius(size: str, grade: str) -> float:
    """Return the inside radius of the bends of a bar [mm]; the grade ends in R or W."""
    column = grade[-1:]
    if column not in BEND_DIAMETERS.columns:
        raise UserError(f"grade: {grade!r} ends neither in R nor in W; write for example '400R'")
    BEND_DIAMETERS.row(size, "bars")
    return BEND_DIAMETERS.number(size, column) / 2


def stirrup_radius(size: str) -> float:
    """Return the inside radius of the bends of a stirrup [mm]."""
    STIRRUP_BENDS.row(size, "stirrups")
    return STIRRUP_BENDS.number(size, "r_s")


def hook_tail(size: str, hook: Hook) -> float:
    """Return the straight tail of a bar's hook beyond its bend, not rounded [mm]."""
    diameter = BARS.number(size, "d_b")
    return TAIL_90 * diameter if hook == "90" else max(TAIL_180 * diameter, LEAST_TAIL)


def hook_leg(size: str, grade: str) -> float:
    """Return the leg of a 90 degree hook, outside to outside, rounded up [mm]."""
    return rounded_up(bend_radius(size, grade) + BARS.number(size, "d_b") + hook_tail(size, "90"))


def bent_bar(
    size: str, length: float, hook_start: Hook = "", hook_end: Hook = "", grade: str = "400R"
) -> BentShape:
    """Return a bar of ``length`` mm outside to outside, the hooks included.

    Hooks are put in one order (a 90 degree hook first), since a bar can be turned end for end.
    """
    hooks = [hook for hook in (hook_start, hook_end) if hook]
    hooks.sort(key=int)
    overall = rounded_up(length, 1.0)
    if not hooks:
        overall = rounded_up(length)
        return BentShape("bar", size, 0.0, (("A", overall),), (overall,), ())
    radius = bend_radius(size, grade)
    past = radius + BARS.number(size, "d_b")
    main = overall - past * len(hooks)
    if main <= 0.0:
        raise UserError(f"bars: a {size} bar of {length:.0f} mm is too short for its hooks")
    tails = [_bar_tail(size, hook, past) for hook in hooks]
    straights = (tails[0], main, tails[1]) if len(tails) > 1 else (main, tails[0])
    legs = _bar_legs(hooks, overall, tails, past)
    return BentShape("bar", size, radius, legs, straights, tuple(float(hook) for hook in hooks))


def _bar_tail(size: str, hook: Hook, past: float) -> float:
    """Straight part beyond the bend, so that the printed leg or tail is in whole steps."""
    tail = hook_tail(size, hook)
    return rounded_up(past + tail) - past if hook == "90" else rounded_up(tail)


def _bar_legs(
    hooks: Sequence[Hook], overall: float, tails: Sequence[float], past: float
) -> tuple[tuple[str, float], ...]:
    """Legs in order: a 90 degree hook by its leg, a 180 degree hook by height and tail."""
    lengths: list[list[float]] = [
        [tail + past] if hook == "90" else [2 * past, tail]
        for hook, tail in zip(hooks, tails, strict=True)
    ]
    if len(lengths) > 1:
        chain = [*reversed(lengths[0]), overall, *lengths[1]]
    else:
        chain = [overall, *lengths[0]]
    return tuple(zip("ABCDE", chain, strict=False))


def stirrup_hook(size: str) -> float:
    """Return the leg of a 90 degree stirrup hook, outside to outside, rounded up [mm]."""
    diameter = BARS.number(size, "d_b")
    tail = max(TAIL_STIRRUP * diameter, LEAST_TAIL)
    return rounded_up(stirrup_radius(size) + diameter + tail)


def stirrup_tail(size: str) -> float:
    """Return the straight tail of a 135 degree stirrup hook, rounded up [mm]."""
    return rounded_up(max(TAIL_STIRRUP * BARS.number(size, "d_b"), LEAST_TAIL))


def open_stirrup(size: str, height: float, width: float) -> BentShape:
    """Return a U with 90 degree hooks at its tops, turned inward; outside to outside [mm]."""
    radius, past, high, wide = _stirrup(size, height, width)
    hook = stirrup_hook(size)
    side, base, tail = high - 2 * past, wide - 2 * past, hook - past
    legs = (("A", hook), ("B", high), ("C", wide), ("D", high), ("E", hook))
    return BentShape(
        "open stirrup", size, radius, legs, (tail, side, base, side, tail), (90.0,) * 4
    )


def closed_stirrup(size: str, height: float, width: float) -> BentShape:
    """Return a closed stirrup, both ends 135 degree hooks at one corner; out to out [mm]."""
    radius, past, high, wide = _stirrup(size, height, width)
    tail = stirrup_tail(size)
    side, base = high - 2 * past, wide - 2 * past
    legs = (("A", high), ("B", wide), ("C", tail))
    bends = (135.0, 90.0, 90.0, 90.0, 135.0)
    return BentShape(
        "closed stirrup", size, radius, legs, (tail, side, base, side, base, tail), bends
    )


def single_leg(size: str, height: float, *, closed: bool) -> BentShape:
    """Return one leg with a hook at each end: 90 degrees, or 135 in a closed stirrup [mm]."""
    radius, past, high, _ = _stirrup(size, height, height)
    side = high - 2 * past
    if closed:
        tail = stirrup_tail(size)
        hooked = (("A", high), ("B", tail))
        return BentShape(
            "closed single leg", size, radius, hooked, (tail, side, tail), (135.0, 135.0)
        )
    hook = stirrup_hook(size)
    legs = (("A", hook), ("B", high), ("C", hook))
    return BentShape(
        "single leg", size, radius, legs, (hook - past, side, hook - past), (90.0, 90.0)
    )


def _stirrup(size: str, height: float, width: float) -> tuple[float, float, float, float]:
    """Radius, radius + bar, and the outer sizes rounded down to whole mm, to keep the cover."""
    radius = stirrup_radius(size)
    past = radius + BARS.number(size, "d_b")
    high, wide = math.floor(height + 1e-6), math.floor(width + 1e-6)
    if min(high, wide) <= 2 * past:
        raise UserError(
            f"stirrups: {size} cannot be bent to {wide:.0f} x {high:.0f} mm outside; write a "
            "thinner bar, less cover or a larger web"
        )
    return radius, past, float(high), float(wide)
