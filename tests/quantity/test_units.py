"""The closed list of units against published definitions and pint's own registry."""

from __future__ import annotations

import subprocess
import sys
import time
from decimal import Decimal
from typing import Any

import pint
import pytest

from lineproof.errors import UserError
from lineproof.quantity import UNITS, factor, internal_factor, registry, unit_named
from lineproof.quantity.units import DEFINITIONS, METRE_SYSTEM, plain_spelling, system_unit

# How pint's default registry, an independent definition of every unit, spells the list.
PINT_NAMES = {
    "": "dimensionless", "mm2": "mm**2", "cm2": "cm**2", "m2": "m**2", "in2": "inch**2",
    "ft2": "foot**2", "mm3": "mm**3", "m3": "m**3", "in3": "inch**3", "ft3": "foot**3",
    "mm4": "mm**4", "m4": "m**4", "in4": "inch**4", "in": "inch", "ft": "foot",
    "lbf": "pound_force", "kip": "kip", "N.mm": "N*mm", "N.m": "N*m", "kN.mm": "kN*mm",
    "kN.m": "kN*m", "MN.m": "MN*m", "lbf.ft": "pound_force*foot", "kip.in": "kip*inch",
    "kip.ft": "kip*foot", "plf": "pound_force/foot", "klf": "kip/foot",
    "psi": "pound_force/inch**2", "ksi": "kip/inch**2", "psf": "pound_force/foot**2",
    "ksf": "kip/foot**2", "N/mm3": "N/mm**3", "kN/m3": "kN/m**3", "pcf": "pound_force/foot**3",
    "kg/m3": "kg/m**3", "lb/ft3": "pound/foot**3", "lb": "pound", "lb/ft": "pound/foot",
    "deg": "degree", "rad": "radian", "h": "hour", "min": "minute", "d": "day",
    "mm2/mm": "mm**2/mm", "mm2/m": "mm**2/m", "N.mm2": "N*mm**2", "kN.m2": "kN*m**2",
    "N.mm/mm": "N*mm/mm", "kN.m/m": "kN*m/m",
}  # fmt: skip


@pytest.fixture(scope="module")
def independent() -> Any:
    return pint.UnitRegistry()


@pytest.mark.parametrize("spelling", UNITS)
def test_every_unit_is_that_of_pints_default_registry(spelling: str, independent: Any) -> None:
    internal = UNITS[spelling].internal
    one = independent.Quantity(1.0, PINT_NAMES.get(spelling, spelling))
    theirs = one.m_as(PINT_NAMES.get(internal, internal))
    assert internal_factor(spelling) == pytest.approx(theirs, rel=1e-14)


@pytest.mark.parametrize(
    ("unit", "into", "exact"),
    [
        ("in", "mm", "25.4"),  # NIST SP 811 appendix B.8: exact
        ("ft", "mm", "304.8"),  # NIST SP 811: exact
        ("lbf", "N", "4.4482216152605"),  # NIST SP 811: exact
        ("lb", "kg", "0.45359237"),  # NIST SP 811: exact
        ("kip", "N", "4448.2216152605"),  # 1000 lbf
        ("kN.m", "N.mm", "1000000"),
        ("kPa", "MPa", "0.001"),
        ("kN/m3", "N/mm3", "0.000001"),  # 1000 N / 1e9 mm3
        ("kN/mm", "kN/m", "1000"),  # stiffness of an elastic support
        ("m4", "mm4", "1000000000000"),
        ("h", "min", "60"),
        ("d", "h", "24"),
    ],
)
def test_published_factors_are_exact(unit: str, into: str, exact: str) -> None:
    assert factor(unit, into) == Decimal(exact)


@pytest.mark.parametrize(
    ("unit", "into", "published"),
    [
        ("psi", "MPa", 6.894757e-3),  # NIST SP 811 B.8, seven digits
        ("psf", "kPa", 4.788026e-2),  # NIST SP 811 B.8
        ("plf", "N/m", 14.59390),  # NIST SP 811 B.8: pound-force per foot
        ("lbf.ft", "N.m", 1.355818),  # NIST SP 811 B.8
        ("lb/ft3", "kg/m3", 16.01846),  # NIST SP 811 B.8
        ("in4", "mm4", 416231.4256),  # 25.4**4, by hand
        ("rad", "deg", 57.29577951308232),  # 180/pi
    ],
)
def test_published_factors_to_their_digits(unit: str, into: str, published: float) -> None:
    assert float(factor(unit, into)) == pytest.approx(published, rel=5e-7)


PAIRS = [(a, b) for a in UNITS.values() for b in UNITS.values() if a.kind == b.kind]


@pytest.mark.parametrize("kind", dict.fromkeys(unit.kind for unit in UNITS.values()))
def test_factors_within_a_kind_are_those_of_pints_exact_decimals(kind: str) -> None:
    # pint's arithmetic on the same definitions with 28 digits, of which a factor keeps 21.
    ureg: Any = pint.UnitRegistry(None, non_int_type=Decimal)
    ureg.load_definitions(DEFINITIONS.splitlines())
    for unit, into in [pair for pair in PAIRS if pair[0].kind == kind]:
        theirs = ureg.Quantity(Decimal(1), unit.expression).m_as(into.expression)
        ours = factor(unit.spelling, into.spelling)
        assert abs(ours / theirs - 1) < Decimal("1e-20"), (unit, into)


def test_there_is_no_factor_between_two_kinds() -> None:
    with pytest.raises(ValueError, match="'kN' is a force, 'mm' a length"):
        factor("kN", "mm")


def test_a_quantity_is_read_and_converted_without_pint() -> None:
    code = (
        "import sys; from lineproof.quantity import read_quantity; "
        "print(read_quantity('w', '1 ksf', 'kPa').value, 'pint' in sys.modules)"
    )
    said = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True)
    # 1 kip/ft2 = 4448.2216152605 N / (304.8 mm)2 = 0.04788025898 MPa
    value, loaded = said.stdout.split()
    assert float(value) == pytest.approx(0.04788025898, rel=1e-9)
    assert loaded == "False"


@pytest.mark.parametrize(
    ("typed", "spelling"),
    [
        ("kN·m", "kN.m"), ("kN*m", "kN.m"), ("mm²", "mm2"), ("mm^4", "mm4"), ("kN/m³", "kN/m3"),
        ("°", "deg"), ("degrees", "deg"), ("N/mm2", "MPa"), ("kN/m2", "kPa"), ("hours", "h"),
        ("kips", "kip"), (" mm ", "mm"), ("-", ""), ("kN-m", "kN.m"), ("kN m", "kN.m"),
        ("kip-ft", "kip.ft"), ("inches", "in"), ("feet", "ft"), ("hr", "h"),
    ],
)  # fmt: skip
def test_other_ways_to_write_a_unit(typed: str, spelling: str) -> None:
    assert plain_spelling(typed) == spelling
    assert unit_named(typed).spelling == spelling


def test_a_wrong_unit_is_refused_with_the_nearest_ones() -> None:
    with pytest.raises(UserError) as caught:
        unit_named("kn")
    # pint reads 'kn' as knots.
    assert str(caught.value) == "'kn' is not a unit of the list; write 'kN'"


@pytest.mark.parametrize(
    ("typed", "advice"),
    [
        ("ft lb", "'lbf.ft'"), ("lb-ft", "'lbf.ft'"),
        ("furlong", "one such as 'mm', 'kN', 'kN.m' or 'MPa'"),
    ],
)  # fmt: skip
def test_a_unit_in_other_words_is_refused_with_what_to_write(typed: str, advice: str) -> None:
    with pytest.raises(UserError) as caught:
        unit_named(typed)
    assert advice in str(caught.value).partition("; write ")[2]


@pytest.mark.parametrize(
    ("typed", "unit"),
    [
        ("kN-m", "kN.m"),
        ("kN m", "kN.m"),
        ("kip-ft", "kip.ft"),
        ("N-mm", "N.mm"),
        ("kN-m/m", "kN.m/m"),
    ],
)
def test_a_hyphen_or_space_between_units_is_their_product(typed: str, unit: str) -> None:
    assert unit_named(typed) is unit_named(unit)


# These texts hang pint, crash it or are read as something else.
HOSTILE = [
    "9**9**9", "m**9**9**9", "*".join(["m"] * 3000), '__import__("os")', "kN--m", "m; s", "kn",
    "me", "fc", "cd", "m" * 10_000, "mm\nm", "mm\x00", "{}", "%s", "(" * 5000, "mm²²", "ｍｍ",
    "\ud800",
]  # fmt: skip


@pytest.mark.parametrize("text", HOSTILE, ids=range(len(HOSTILE)))
def test_hostile_unit_text_is_refused_quickly(text: str) -> None:
    start = time.perf_counter()
    with pytest.raises(UserError):
        unit_named(text)
    assert time.perf_counter() - start < 2


def test_the_metre_system_holds_units_of_the_list_by_powers_of_ten() -> None:
    for kind, unit in METRE_SYSTEM.items():
        assert UNITS[unit].kind == kind
        # Substitutions shift the decimal point only.
        assert factor(UNITS[unit].internal, unit).normalize().as_tuple().digits == (1,)
    assert system_unit("kN.m", "N-mm") == "N.mm"
    assert system_unit("MPa", "kN-m") == "kPa"
    assert system_unit("kg", "kN-m") == "kg"


def test_the_registry_is_made_once_and_keeps_the_authors_order() -> None:
    assert registry() is registry()
    assert f"{registry().Quantity(1.0, 'kN*m').units:~}" == "kN * m"
