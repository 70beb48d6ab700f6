"""A small calculation that uses every kind of entry."""

from __future__ import annotations

import math
from typing import Any

import pytest

from lineproof.formula import FROM_MEMORY, Notation, Symbol, criterion, formula
from lineproof.record import Record, procedure
from lineproof.sheet import LookupTable, Sheet

NOTATION = Notation([
    Symbol("f_c", "f", "c", "′", "specified compressive strength", "MPa"),
    Symbol("M_f", "M", "f", "", "factored moment", "kN.m"),
    Symbol("M_r", "M", "r", "", "moment resistance", "kN.m"),
])  # fmt: skip
BARS = LookupTable(
    "bars", "bar size", {"A_b": "mm2"}, {"20M": {"A_b": "300"}, "25M": {"A_b": "500"}}, "a table"
)
E_C = formula(
    "E_c = 4500*sqrt(f_c)", unit="MPa", clause="8.6.2.3", title="Modulus of elasticity",
    basis=FROM_MEMORY, numbers={"4500": "MPa^0.5"},
)  # fmt: skip
RESISTS = criterion(
    "M_f <= M_r", unit="kN.m", clause="8.1.3", title="Resistance", yes="Enough.", no="Not enough."
)


@procedure("side of a square", 1, "Side of a square of given area", ("A_sq",))
def square_side(area: float, **_: float) -> float:
    """Return the root of an area [mm2] in mm."""
    return math.sqrt(area)


def make(**typed: str) -> Sheet:
    """Make the calculation; keywords replace typed texts."""
    given = {"f_c": "32 MPa", "h": "24 in", "w": "41.3 kN/m", "L": "7.6 m", "n": "6"} | typed
    sheet = Sheet("B7", "Gallery floor beam B7", notation=NOTATION)
    sheet.codes = {"pair": "NBC 2015 + A23.3-14"}
    sheet.not_covered = [{"check": "Shear", "clause": "11.3"}]
    with sheet.part("inputs", "Inputs"):
        sheet.given("f_c", given["f_c"], source="drawing A-210")
        sheet.given("h", given["h"], "overall depth", unit="mm")
        sheet.given("w", given["w"], "factored load")
        sheet.given("L", given["L"], "span")
        sheet.given("n", given["n"], "number of bars")
        sheet.lookup("A_b", BARS, "25M", title="area of a bar")
    with sheet.part("flexure", "Flexure"):
        sheet.line(E_C)
        moment = sheet.line("M_f = w*L**2/8", title="Factored moment")
        sheet.line("A_s = n*A_b", unit="mm2")
        sheet.line("d = 0.9*h", unit="mm")
        sheet.line("M_r = 0.85*A_s*f_y*(d - a/2)", f_y=sheet.given("f_y", "400 MPa"),
                   a=sheet.given("a", "26 mm"))  # fmt: skip
        sheet.check(RESISTS)
        sheet.check("M_f <= 0.5*M_r", key="half", accepted="temporary", initials="A.B.")
        if sheet.decide("a <= 140*a", key="flange"):
            sheet.note("why", "The block lies in the flange.")
    with sheet.part("found", "Found"):
        sheet.found(
            "s", square_side, criterion("abs(s*s - A_sq) <= 0.001*A_sq", unit="mm2"), unit="mm",
            title="side of a square", settings={"tolerance": 1e-9},
            A_sq=sheet.line("A_sq = h*h", unit="mm2"),
        )  # fmt: skip
        sheet.table("bars", ["size", "area, mm2"], [["20M", "300"]], title="Bars")
        sheet.figure("section", {"shapes": [[0.5, 1]]}, title="Section", alt="A section",
                     rests_on=[moment, sheet.entry("inputs/h")])  # fmt: skip
    return sheet


@pytest.fixture
def sample() -> Record:
    """Return the record of the calculation as it comes back from a file."""
    return Record.from_text(make().close().to_text())


@pytest.fixture
def data(sample: Record) -> dict[str, Any]:
    """Return its plain data, free to be changed."""
    return sample.data


@pytest.fixture
def make_sheet() -> Any:
    """Return the function that makes the calculation."""
    return make
