"""The closed list of units: exact factors between them, and a pint registry of the same.

pint alone would read ``kn`` as knots, does not know psf, and hangs on hostile text; so only the
spellings below ever reach it, and only where units are proved.  Inside the package every value is
a float in N, mm, MPa (and degrees, kg/m3, hours as such): the *internal unit* of its dimension.
"""

from __future__ import annotations

import difflib
import re
from collections.abc import Mapping
from dataclasses import dataclass
from decimal import Decimal
from functools import cache, lru_cache
from typing import TYPE_CHECKING, Any

from lineproof.errors import UserError

if TYPE_CHECKING:
    import pint

DEFINITIONS = """\
metre = [length] = m
kilogram = [mass] = kg
second = [time] = s
degree = [angle] = deg
minute = 60 * s = min_t
hour = 3600 * s = h_t
day = 86400 * s = d_t
millimetre = 0.001 * m = mm
centimetre = 0.01 * m = cm
inch = 0.0254 * m = in_l
foot = 0.3048 * m = ft
newton = kg * m / s ** 2 = N
kilonewton = 1000 * N = kN
meganewton = 1000000 * N = MN
pascal = N / m ** 2 = Pa
kilopascal = 1000 * Pa = kPa
megapascal = 1000000 * Pa = MPa
gigapascal = 1000000000 * Pa = GPa
pound = 0.45359237 * kg = lb
pound_force = 4.4482216152605 * N = lbf
kip = 4448.2216152605 * N
radian = 57.295779513082320876798154814105 * deg = rad
"""
"""Every unit by those before it, as pint reads definitions."""


@dataclass(frozen=True, slots=True)
class Unit:
    """One unit of the closed list.

    ``expression`` is what pint reads, ``kind`` the word for its dimension, ``internal`` the unit
    in which values of that kind are kept.
    """

    spelling: str
    expression: str
    kind: str
    internal: str


_KINDS: dict[str, tuple[str, dict[str, str]]] = {
    "number": ("", {"": "dimensionless"}),
    "length": ("mm", {"mm": "mm", "cm": "cm", "m": "m", "in": "in_l", "ft": "ft"}),
    "area": (
        "mm2",
        {"mm2": "mm**2", "cm2": "cm**2", "m2": "m**2", "in2": "in_l**2", "ft2": "ft**2"},
    ),
    "volume": ("mm3", {"mm3": "mm**3", "m3": "m**3", "in3": "in_l**3", "ft3": "ft**3"}),
    "moment of inertia": ("mm4", {"mm4": "mm**4", "m4": "m**4", "in4": "in_l**4"}),
    "force": ("N", {"N": "N", "kN": "kN", "MN": "MN", "lbf": "lbf", "kip": "kip"}),
    "moment": (
        "N.mm",
        {
            "N.mm": "N*mm",
            "N.m": "N*m",
            "kN.mm": "kN*mm",
            "kN.m": "kN*m",
            "MN.m": "MN*m",
            "lbf.ft": "lbf*ft",
            "kip.in": "kip*in_l",
            "kip.ft": "kip*ft",
        },
    ),
    "torque per length": ("N.mm/mm", {"N.mm/mm": "N*mm/mm", "kN.m/m": "kN*m/m"}),
    "load per length": (
        "N/mm",
        {
            "N/mm": "N/mm",
            "N/m": "N/m",
            "kN/m": "kN/m",
            "plf": "lbf/ft",
            "klf": "kip/ft",
            "kN/mm": "kN/mm",  # stiffness of a spring, of the same dimension
        },
    ),
    "stress or pressure": (
        "MPa",
        {
            "MPa": "MPa",
            "Pa": "Pa",
            "kPa": "kPa",
            "GPa": "GPa",
            "psi": "lbf/in_l**2",
            "ksi": "kip/in_l**2",
            "psf": "lbf/ft**2",
            "ksf": "kip/ft**2",
        },
    ),
    "bending stiffness": ("N.mm2", {"N.mm2": "N*mm**2", "kN.m2": "kN*m**2"}),
    "unit weight": ("N/mm3", {"N/mm3": "N/mm**3", "kN/m3": "kN/m**3", "pcf": "lbf/ft**3"}),
    "density": ("kg/m3", {"kg/m3": "kg/m**3", "lb/ft3": "lb/ft**3"}),
    "mass": ("kg", {"kg": "kg", "lb": "lb"}),
    "mass per length": ("kg/m", {"kg/m": "kg/m", "lb/ft": "lb/ft"}),
    "angle": ("deg", {"deg": "deg", "rad": "rad"}),
    "time": ("h", {"h": "h_t", "min": "min_t", "d": "d_t"}),
    "one over length": ("1/mm", {"1/mm": "1/mm", "1/m": "1/m"}),
    "area per length": ("mm2/mm", {"mm2/mm": "mm**2/mm", "mm2/m": "mm**2/m"}),
}

UNITS: dict[str, Unit] = {
    spelling: Unit(spelling, expression, kind, internal)
    for kind, (internal, spellings) in _KINDS.items()
    for spelling, expression in spellings.items()
}

NOT_METRIC = frozenset(
    {"in", "ft", "in2", "ft2", "in3", "ft3", "in4", "lbf", "kip", "lbf.ft", "kip.in", "kip.ft",
     "plf", "klf", "psi", "ksi", "psf", "ksf", "pcf", "lb/ft3", "lb", "lb/ft", "min"}
)  # fmt: skip
"""Units of the list in which a value is printed as typed and converted."""

_SAME_UNIT = {
    "degrees": "deg", "degree": "deg", "°": "deg", "kN/m2": "kPa", "N/mm2": "MPa", "kNm": "kN.m",
    "kip.ft.": "kip.ft", "kips": "kip", "kip/ft": "klf", "kips/ft": "klf", "lbf/ft": "plf",
    "lb/ft2": "psf", "lbf/ft2": "psf", "kip/ft2": "ksf", "kips/ft2": "ksf", "lb/in2": "psi",
    "lbf/in2": "psi", "kip/in2": "ksi", "kips/in2": "ksi", "lbf/ft3": "pcf",
    "metre": "m", "metres": "m", "meter": "m", "meters": "m",
    "inches": "in", "inch": "in", "feet": "ft", "hours": "h", "hour": "h", "hr": "h",
    "days": "d", "-": "",
}  # fmt: skip

_SHORT = {"k": "kip", "k.ft": "kip.ft", "ft.k": "kip.ft", "k/ft": "klf", "k/ft2": "ksf", "#": "lbf"}
"""Short forms that are not taken, since k is a factor of SI as well, with what they stand for."""

_EXAMPLE = {"length": "mm", "stress or pressure": "MPa", "moment": "kN.m", "force": "kN"}
_EXAMPLES = "one such as 'mm', 'kN', 'kN.m' or 'MPa'"

_PLAIN = str.maketrans("·⋅∙•×*²³⁴", "......234")
"""Dots and crosses between units, raised digits."""

_FACTOR = re.compile(r"([*/]?) ?([A-Za-z_]+|[0-9.]+)(?: ?\*\* ?([0-9]))?")
"""One factor of an expression that pint reads: its sign, its unit or number, its power."""

_BETWEEN_UNITS = re.compile(r"(?<=[A-Za-z])[- ](?=[a-z])")
"""A hyphen or a space between two units, which stands for their product."""

METRE_SYSTEM = {
    "length": "m", "area": "m2", "volume": "m3", "moment of inertia": "m4", "force": "kN",
    "moment": "kN.m", "load per length": "kN/m", "stress or pressure": "kPa",
    "unit weight": "kN/m3", "one over length": "1/m", "area per length": "mm2/mm",
    "bending stiffness": "kN.m2", "torque per length": "kN.m/m",
}  # fmt: skip
"""Units in which a formula of loads is substituted: kN and m instead of N and mm."""


def plain_spelling(text: str) -> str:
    """Return the closed list's way to write a unit.

    >>> plain_spelling("kN·m"), plain_spelling("kN-m"), plain_spelling("N/mm²")
    ('kN.m', 'kN.m', 'MPa')
    """
    tidy = text.strip()
    tidy = tidy.translate(_PLAIN).replace("^", "")
    product = _BETWEEN_UNITS.sub(".", tidy)
    tidy = product if product in UNITS else tidy
    return _SAME_UNIT.get(tidy, tidy)


@lru_cache(maxsize=1024)
def unit_named(text: str, wanted: Unit | None = None) -> Unit:
    """Return the unit of the closed list, or raise :class:`UserError` with the nearest names.

    With ``wanted``, the error names units of its kind alone.
    """
    spelling = plain_spelling(text) if len(text) <= 20 else text  # noqa: PLR2004 - longest is 7
    found = UNITS.get(spelling)
    if found is None:
        raise UserError(
            f"{text[:40]!r} is not a unit of the list; write {_advice(spelling, wanted)}"
        )
    return found


def _advice(spelling: str, wanted: Unit | None) -> str:
    near = [n for n in _nearest(spelling) if wanted is None or UNITS[n].kind == wanted.kind]
    meant = _SHORT.get(spelling.lower().replace(" ", ".").replace("-", "."))
    if meant and (wanted is None or UNITS[meant].kind == wanted.kind):
        return repr(meant)
    if any(letter.isdigit() for letter in spelling[1:-1]) and " " in spelling:
        return "one number with one unit, such as '26 in', and a comma between two texts of a list"
    if near:
        return " or ".join(map(repr, near))
    return f"it in {', '.join(usual_units(wanted))}" if wanted else _EXAMPLES


def _nearest(spelling: str) -> list[str]:
    folded = {name.lower(): name for name in UNITS if name}
    same = {name.lower(): unit for name, unit in _SAME_UNIT.items() if unit} | folded
    if spelling.lower() in same:  # right but for capitals
        return [same[spelling.lower()]]
    words = ["lbf" if word == "lb" else word for word in re.split("[ .-]+", spelling[:20].lower())]
    for product in (".".join(words), ".".join(reversed(words))):  # ft lb, kip-in
        if product in folded:
            return [folded[product]]
    close = difflib.get_close_matches(spelling[:20].lower(), folded, n=3, cutoff=0.6)
    return [folded[name] for name in close]


def usual_units(wanted: Unit) -> tuple[str, ...]:
    """Return the spellings for a kind, the usual one first: kPa for loads."""
    return tuple(dict.fromkeys((example_unit(wanted), *units_of_kind(wanted.kind))))


def units_of_kind(kind: str) -> tuple[str, ...]:
    """Return the spellings that a value of this kind may be typed in."""
    return tuple(_KINDS[kind][1])


def example_unit(unit: Unit) -> str:
    """Return the unit an error message suggests for values printed in ``unit``."""
    return unit.spelling or _EXAMPLE.get(unit.kind, "")


@cache
def registry() -> pint.UnitRegistry[Any]:
    """Return the pint registry of the definitions above, keeping the author's order of units."""
    import pint  # noqa: PLC0415 - 0.2 s, only needed where units are proved or typed as pint's

    ureg: pint.UnitRegistry[Any] = pint.UnitRegistry(None)
    ureg.load_definitions(DEFINITIONS.splitlines())
    ureg.formatter.default_sort_func = None
    return ureg


@cache
def factor(unit: str, into: str) -> Decimal:
    """Return by what a number in ``unit`` is multiplied to stand in ``into`` (exact decimal).

    Raises ``ValueError`` for units of two kinds.
    """
    first, second = UNITS[unit], UNITS[into]
    if first.kind != second.kind:
        msg = f"{unit!r} is a {first.kind}, {into!r} a {second.kind}"
        raise ValueError(msg)
    sizes = _sizes()
    converted = _size(first.expression, sizes) / _size(second.expression, sizes)
    # A division leaves noise in the last of 28 digits, such as 1.000...001.
    return converted.quantize(Decimal(1).scaleb(converted.adjusted() - 20)).normalize()


@cache
def _sizes() -> dict[str, Decimal]:
    """Return how large the units of the definitions above are, in their base units."""
    sizes = {"dimensionless": Decimal(1)}
    for line in DEFINITIONS.splitlines():
        name, made_of, *symbol = line.split(" = ")
        size = Decimal(1) if made_of.startswith("[") else _size(made_of, sizes)
        sizes.update(dict.fromkeys((name, *symbol), size))
    return sizes


def _size(expression: str, sizes: Mapping[str, Decimal]) -> Decimal:
    """Return the product of what stands in an expression such as ``kip/in_l**2``."""
    size = Decimal(1)
    for sign, name, power in _FACTOR.findall(expression):
        one = (sizes[name] if name in sizes else Decimal(name)) ** int(power or 1)
        size = size / one if sign == "/" else size * one
    return size


@cache
def power_of_ten(unit: str, into: str) -> int | None:
    """Return the power of ten by which two units differ, or None where it is another number.

    >>> power_of_ten("kN.m", "N.mm"), power_of_ten("ft", "mm")
    (6, None)
    """
    digits = factor(unit, into).normalize().as_tuple()
    return int(digits.exponent) if digits.digits == (1,) else None


@cache
def internal_factor(unit: str) -> float:
    """Return the float that turns a number in ``unit`` into the internal unit of its kind."""
    return float(factor(unit, UNITS[unit].internal))


def system_unit(unit: str, system: str) -> str:
    """Return the unit in which a value printed in ``unit`` is substituted in a unit system."""
    kind = UNITS[unit].kind
    internal = UNITS[unit].internal
    return METRE_SYSTEM.get(kind, internal) if system == "kN-m" else internal


@cache
def system_factor(unit: str, system: str) -> float:
    """Return the float that turns a number in :func:`system_unit` into the internal unit."""
    return internal_factor(system_unit(unit, system))
