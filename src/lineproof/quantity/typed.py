"""Reading a quantity as a person types it: ``"7.6 m"``."""

from __future__ import annotations

import math
import re
from dataclasses import dataclass
from decimal import Decimal
from functools import lru_cache
from typing import Protocol, runtime_checkable

from lineproof.errors import UserError
from lineproof.quantity.digits import MINUS
from lineproof.quantity.feet import feet_advice, one_unit
from lineproof.quantity.units import (
    Unit,
    example_unit,
    factor,
    unit_named,
    usual_units,
)

# ASCII digits only; the number ends where no digit and no point follows.
_NUMBER = r"[+-]?(?:[0-9]{1,20}(?:\.[0-9]{0,20})?|\.[0-9]{1,20})(?:[eE][+-]?[0-9]{1,2})?"
_TYPED = re.compile(rf"({_NUMBER})(?![0-9.])(.*)\Z", re.DOTALL)
_LONGEST_ECHO = 60
_MOST_KEPT = 4096
"""Texts that are kept as read: a record is read from the same ones again and again."""
_POUNDS = {
    ("lb", "force"): "lbf", ("lb/ft", "load per length"): "plf", ("pcf", "density"): "lb/ft3",
    ("lb/ft3", "unit weight"): "pcf",
}  # fmt: skip
"""Units of pounds of mass and of force that are written alike in practice."""
_PINT_NAMES = {"in_l": "inch", "h_t": "hour", "min_t": "minute", "d_t": "day"}


@runtime_checkable
class PintQuantity(Protocol):
    """What we need of a quantity of any pint registry."""

    @property
    def magnitude(self) -> float:
        """The bare number."""

    @property
    def units(self) -> object:
        """The unit it stands in."""

    def m_as(self, units: str) -> float:
        """Return the bare number in another unit."""


QuantityInput = str | float | PintQuantity


@dataclass(frozen=True, slots=True)
class Typed:
    """A quantity as typed and as kept.

    ``text`` is what the user wrote, ``number`` (as a printed number: ``0.5`` for ``.5``) and
    ``unit`` its pieces (``306.5`` and ``in`` for ``25'-6 1/2"``), ``exact`` the decimal in the
    internal unit, ``value`` the float the calculation uses [internal unit].
    """

    text: str
    number: str
    unit: str
    exact: Decimal
    value: float


def echo(given: object) -> str:
    """Return a short quoted form of what was given, for error messages."""
    if isinstance(given, int) and not -(10**_LONGEST_ECHO) < given < 10**_LONGEST_ECHO:
        return "a number of more than 60 digits"  # Python itself refuses to print the longest
    text = given if isinstance(given, str) else str(given)
    cut = text if len(text) <= _LONGEST_ECHO else text[: _LONGEST_ECHO - 1] + "…"
    return repr(cut)


def read_quantity(name: str, given: QuantityInput, unit: str, usual: str = "25") -> Typed:
    """Read a quantity of the kind of ``unit``.

    ``name`` is the input named in the error, ``usual`` the number of the example that it gives; a
    bare number is taken only where ``unit`` is "".
    Raises :class:`UserError` that says what to type.

    >>> read_quantity("span", "7.6 m", "mm").value, read_quantity("start", "−0.1 m", "mm").value
    (7600.0, -100.0)
    >>> read_quantity("f_c", "32", "MPa")
    Traceback (most recent call last):
    lineproof.errors.UserError: f_c: '32' has no unit; write '32 MPa'
    """
    read = _read_text if given.__class__ is str else _read
    return read(name, given, unit, usual)  # type: ignore[arg-type]


@lru_cache(maxsize=_MOST_KEPT)
def _read_text(name: str, given: str, unit: str, usual: str) -> Typed:
    return _read(name, given, unit, usual)


def _read(name: str, given: QuantityInput, unit: str, usual: str) -> Typed:
    wanted = unit_named(unit)
    sample = repr(f"{usual} {example_unit(wanted)}".strip())
    if isinstance(given, bool) or given is None:
        raise UserError(f"{name}: {echo(given)} is not a quantity; write {sample}")
    if not isinstance(given, str | int | float | Decimal):
        return _read_pint(name, given, wanted, sample)
    # A place told in a package has a true minus, and is typed back with it.
    text = " ".join(given.replace(MINUS, "-").split()) if isinstance(given, str) else _plain(given)
    match = _TYPED.match(one_unit(text))
    if match is None or match[2].startswith(","):
        raise UserError(
            f"{name}: {echo(given)} is not a number with a unit; {_hint(text, wanted, sample)}"
        )
    number, unit_text = match[1], match[2].strip()
    return _checked(name, text, number, _typed_unit(name, given, number, unit_text, wanted), wanted)


def _plain(number: float | Decimal) -> str:
    if isinstance(number, int):
        return str(number) if abs(number) < 10**_LONGEST_ECHO else ""
    # A float of another library may show itself as "float64(0.5)".
    return repr(float(number)) if isinstance(number, float) else str(number)


def _as_printed(number: str) -> str:
    """Return a typed number as a printed number: every digit kept, one way to write it.

    >>> _as_printed("+.50"), _as_printed("5.E+06"), _as_printed("-007")
    ('0.50', '5e6', '-7')
    """
    mantissa, _, power = number.lower().partition("e")
    whole, _, decimals = mantissa.lstrip("+-").partition(".")
    plain = (whole.lstrip("0") or "0") + (f".{decimals}" if decimals else "")
    sign = "-" if number.startswith("-") and plain.strip("0.") else ""
    return sign + plain + (f"e{int(power)}" if power and int(power) else "")


def _hint(text: str, wanted: Unit, sample: str) -> str:
    if re.match(r"[+-]?\d+,\d", text):
        point = text.replace(",", ".", 1)[:_LONGEST_ECHO]
        if re.match(r"[+-]?\d{1,3}(,\d{3})+(?!\d)", text):  # 7,600 may be 7600 or 7.600
            whole = text.replace(",", "")[:_LONGEST_ECHO]
            if text.count(",") > 1:
                return f"write {whole!r}"
            return f"write {whole!r} where the comma parts thousands, else {point!r}"
        return f"write a decimal point: {point!r}"
    feet = feet_advice(text) if wanted.kind == "length" else ""
    return f"write {feet}" if feet else f"write for example {sample}"


def _typed_unit(name: str, given: object, number: str, unit_text: str, wanted: Unit) -> Unit:
    if not unit_text:
        if wanted.kind != "number":
            suggestion = f"{number} {example_unit(wanted)}"
            raise UserError(f"{name}: {echo(given)} has no unit; write {suggestion!r}")
        return wanted
    if unit_text == "%" and wanted.kind == "number":
        share = f"{Decimal(number) / 100:f}"
        raise UserError(f"{name}: {echo(given)} is in percent; write {share!r}")
    # Where no unit is asked, one of any kind may have been meant.
    if re.match(r"[+-]?\d{1,3}( \d{3})+(?![\d.])", str(given)):
        whole = re.sub(r"(?<=\d) (?=\d)", "", str(given))[:_LONGEST_ECHO]
        raise UserError(f"{name}: {echo(given)} has spaces between its digits; write {whole!r}")
    try:
        unit = unit_named(unit_text, None if wanted.kind == "number" else wanted)
    except UserError as error:
        feet = feet_advice(str(given)) if wanted.kind == "length" else ""
        said = f" is not understood; write {feet}" if feet else f": {error.faults[0]}"
        raise UserError(f"{name}: {echo(given)}{said}") from None
    if unit.kind != wanted.kind:
        if wanted.kind == "number":
            raise UserError(f"{name}: {echo(given)} has a unit; write the bare number {number!r}")
        pounds = _POUNDS.get((unit.spelling, wanted.kind))
        advice = repr(f"{number} {pounds}") if pounds else f"it in {', '.join(usual_units(wanted))}"
        raise UserError(
            f"{name}: {echo(given)} is {_a(unit.kind)}, but {_a(wanted.kind)} is needed; "
            f"write {advice}"
        )
    return unit


def _a(kind: str) -> str:
    return f"an {kind}" if kind.startswith("a") else f"a {kind}"


def _read_pint(name: str, given: object, wanted: Unit, sample: str) -> Typed:
    if not isinstance(given, PintQuantity):
        raise UserError(f"{name}: {echo(given)} is not a quantity; write {sample}")
    # Full names stand in every registry, ours and pint's own.
    pint_name = wanted.expression
    for ours, full in _PINT_NAMES.items():
        pint_name = pint_name.replace(ours, full)
    try:
        number = float(given.m_as(pint_name))
    except Exception:  # noqa: BLE001 - any registry, any of its errors
        raise UserError(
            f"{name}: {echo(given)} is not a {wanted.kind}; write it in {example_unit(wanted)}"
        ) from None
    text = _plain(float(f"{number:.12g}"))
    if not math.isfinite(number):
        raise UserError(f"{name}: {echo(given)} is not a finite number; write {sample}")
    return _checked(name, f"{text} {wanted.spelling}".strip(), text, wanted, wanted)


def _checked(name: str, text: str, number: str, unit: Unit, wanted: Unit) -> Typed:
    exact = Decimal(number) * factor(unit.spelling, wanted.internal)
    value = float(exact)
    if not math.isfinite(value):
        raise UserError(f"{name}: {echo(text)} is out of range; write a smaller number")
    return Typed(text, _as_printed(number), unit.spelling, exact, value)
