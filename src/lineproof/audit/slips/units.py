"""Slips of units: a value taken in another unit of its kind."""

from __future__ import annotations

import math
from functools import cache

from lineproof.typeset.values import unit_text

INCH, KIP, KSI = 25.4, 4.4482216152605, 6.894757293168
"""An inch in mm, a kip in kN, a ksi in MPa: exact by definition, but for the last digits of KSI."""
_USUAL: dict[str, tuple[tuple[float, str], ...]] = {
    "mm": ((1e-3, "m for mm"), (1e3, "mm for m"), (10, "mm for cm"), (0.1, "cm for mm")),
    "mm2": ((1e-6, "m2 for mm2"), (1e6, "mm2 for m2"), (1e-2, "cm2 for mm2"),
            (100, "mm2 for cm2")),
    "mm4": ((1e-12, "m4 for mm4"), (1e-6, "10^6 mm4 for mm4"), (1e-4, "cm4 for mm4")),
    "N": ((1e-3, "kN for N"), (1e3, "N for kN")),
    "N.mm": ((1e-6, "kN.m for N.mm"), (1e6, "N.mm for kN.m"), (1e-3, "N.m for N.mm"),
             (1e3, "N.mm for N.m")),
    "N/mm": ((1e-3, "kN/m for N/m"), (1e3, "N/m for kN/m")),
    "MPa": ((1e-3, "MPa for kPa"), (1e3, "kPa for MPa"), (1e6, "Pa for MPa"),
            (1e-6, "MPa for Pa")),
    "N/mm3": ((1e-3, "kN/m3 for N/m3"), (1e3, "N/m3 for kN/m3")),
    "N.mm2": ((1e-9, "kN.m2 for N.mm2"),),
    "deg": ((math.pi / 180, "radians for degrees"), (180 / math.pi, "degrees for radians")),
}  # fmt: skip
_CUSTOMARY: dict[str, tuple[tuple[float, str], ...]] = {
    "mm": ((INCH, "mm for in"), (1 / INCH, "in for mm"), (12 * INCH, "mm for ft"),
           (1 / (12 * INCH), "ft for mm")),
    "mm2": ((INCH**2, "mm2 for in2"), (INCH**-2, "in2 for mm2")),
    "N": ((KIP, "kN for kip"), (1 / KIP, "kip for kN")),
    "N.mm": ((KIP * 0.3048, "kN.m for kip.ft"), (1 / (KIP * 0.3048), "kip.ft for kN.m")),
    "N/mm": ((KIP / 0.3048, "kN/m for kip/ft"), (0.3048 / KIP, "kip/ft for kN/m")),
    "MPa": ((1e3 / KSI, "psi for MPa"), (KSI / 1e3, "MPa for psi"), (KSI, "MPa for ksi"),
            (1 / KSI, "ksi for MPa")),
}  # fmt: skip
_POWERS = (1e3, 1e-3, 1e6, 1e-6)
_PLAIN = (1e3, 1e-3)
"""Powers of ten by which a number without a unit is off, such as a strain per thousand."""
_WORDS = {
    "in": "inches", "ft": "feet", "in2": "square inches", "10^6 mm4": "10⁶ mm⁴",
    "radians": "radians", "degrees": "degrees", "kip/ft": "kip/ft",
}  # fmt: skip
_NEAR = 1e-6


@cache
def ways_of_units(unit: str) -> tuple[tuple[float, str, str], ...]:
    """Return the slips of units for an internal unit: factor, family, and what is said of it.

    >>> ways_of_units("N")[0], ways_of_units("")[1]
    ((0.001, 'unit', 'in kN taken as N'), (0.001, 'unit', '1000 times too small'))
    """
    if not unit:
        return tuple((factor, "unit", _times(factor)) for factor in _PLAIN)
    usual = _USUAL.get(unit, ())
    powers = [
        (power, "other unit", _times(power))
        for power in (_POWERS if unit != "deg" else ())
        if all(abs(power / factor - 1) > _NEAR for factor, _ in usual)
    ]
    return (
        *((factor, "unit", _taken(units)) for factor, units in usual),
        *((factor, "other unit", _taken(units)) for factor, units in _CUSTOMARY.get(unit, ())),
        *powers,
    )


def _taken(units: str) -> str:
    """Say of ``kN for N`` what was done."""
    given, taken = (_WORDS.get(unit) or unit_text(unit) for unit in units.split(" for "))
    return f"in {given} taken as {taken}"


def _times(factor: float) -> str:
    power = round(math.log10(factor))
    return f"{10 ** abs(power)} times too {'large' if power > 0 else 'small'}"
