"""A realistic record of one floor beam, made by the sheet itself, with every kind of entry."""

from __future__ import annotations

import copy
from typing import Any

import pytest

from lineproof.beams.figure_loading import UniformLoad, loading_figure
from lineproof.beams.figures import BarRow, SectionShape, section_figure
from lineproof.drawing import to_json
from lineproof.formula import Notation, Symbol, criterion, formula
from lineproof.record import Procedure
from lineproof.record.procedures import PROCEDURES, procedure
from lineproof.sheet import Sheet
from lineproof.sheet.tables import LookupTable

NOTATION = Notation(
    Symbol(*row)
    for row in (
        ("L", "L", "", "", "span, centre to centre of supports", "m"),
        ("s_b", "s", "b", "", "spacing of beams", "m"),
        ("b_w", "b", "w", "", "width of web", "mm"),
        ("b", "b", "", "", "effective width of flange", "mm"),
        ("h", "h", "", "", "overall depth", "mm"),
        ("h_f", "h", "f", "", "thickness of flange", "mm"),
        ("d", "d", "", "", "depth to centroid of tension steel", "mm"),
        ("c_c", "c", "c", "", "clear cover to stirrup", "mm"),
        ("d_st", "d", "st", "", "diameter of stirrup", "mm"),
        ("d_b", "d", "b", "", "diameter of bar", "mm"),
        ("A_b", "A", "b", "", "area of one bar", "mm2"),
        ("n_b", "n", "b", "", "number of bars", ""),
        ("A_s", "A", "s", "", "area of tension steel", "mm2"),
        ("A_s_min", "A", "s,min", "", "minimum area of tension steel", "mm2"),
        ("f_c", "f", "c", "′", "specified compressive strength of concrete", "MPa"),
        ("f_y", "f", "y", "", "specified yield strength of steel", "MPa"),
        ("f_r", "f", "r", "", "modulus of rupture of concrete", "MPa"),
        ("E_c", "E", "c", "", "modulus of elasticity of concrete", "MPa"),
        ("lambda_", "λ", "", "", "factor for density of concrete", ""),
        ("phi_c", "φ", "c", "", "resistance factor for concrete", ""),
        ("phi_s", "φ", "s", "", "resistance factor for steel", ""),
        ("alpha_1", "α", "1", "", "ratio of average stress in the block to strength", ""),
        ("beta_1", "β", "1", "", "ratio of depth of the block to neutral axis", ""),
        ("a", "a", "", "", "depth of the stress block", "mm"),
        ("c", "c", "", "", "depth to neutral axis", "mm"),
        ("c_n", "c", "n", "", "depth to neutral axis, found numerically", "mm"),
        ("M_f", "M", "f", "", "factored moment", "kN.m"),
        ("M_r", "M", "r", "", "factored moment resistance", "kN.m"),
        ("M_cr", "M", "cr", "", "cracking moment", "kN.m"),
        ("I_g", "I", "g", "", "second moment of area of gross section", "mm4"),
        ("y_b", "y", "b", "", "depth of centroid above bottom face", "mm"),
        ("gamma_c", "γ", "c", "", "unit weight of reinforced concrete", "kN/m3"),
        ("p_L", "p", "L", "", "specified live load", "kPa"),
        ("p_SD", "p", "SD", "", "superimposed dead load", "kPa"),
        ("w_slab", "w", "slab", "", "load of slab", "kN/m"),
        ("w_web", "w", "web", "", "load of web below slab", "kN/m"),
        ("w_D", "w", "D", "", "dead load", "kN/m"),
        ("w_L", "w", "L", "", "live load", "kN/m"),
        ("w_f", "w", "f", "", "factored load", "kN/m"),
    )
)

BARS = LookupTable(
    "Canadian reinforcing bars",
    "bar",
    {"d_b": "mm", "A_b": "mm2"},
    {"10M": {"d_b": "11.3", "A_b": "100"}, "25M": {"d_b": "25.2", "A_b": "500"}},
    "CSA G30.18",
)

PROJECT: dict[str, Any] = {
    "project": {
        "name": "Kiln Lane Workshop and Gallery",
        "number": "2026-014",
        "address": "14 Kiln Lane, Fernhollow",
        "client": "Fernhollow Ceramics Society",
    },
    "firm": {"name": "Northrow Structural Ltd.", "permit": "P-00000"},
    "codes": {"pair": "NBC 2015 + A23.3-14", "amendments": "local by-law 12-2019"},
    "building": {"importance": "Normal"},
    "location": {"grid": "C / 2-3", "level": "Gallery, T.O. slab +4.200"},
    "drawings": [
        {"number": "S-201", "revision": "2", "title": "Gallery framing plan"},
        {"number": "A-210", "revision": "C", "title": "Gallery floor plan"},
    ],
    "issue": {
        "status": "preliminary",
        "date": "2026-11-20",
        "prepared_by": "A. Verdon",
        "superseded": "Revision A, 2026-10-02",
    },
    "revisions": [
        {"letter": "A", "date": "2026-10-02", "description": "For review"},
        {"letter": "B", "date": "2026-11-20", "description": "Superimposed load raised"},
    ],
    "criteria": {"exposure": "N, interior", "fire_resistance": "2 h", "use": "assembly, 4.8 kPa"},
    "confirmed": [{"clause": "8.4.3", "edition": "CSA A23.3-14", "by": "A.V.", "on": "2026-11-18"}],
}


def _neutral_axis() -> Procedure:
    known = PROCEDURES.get("tests.neutral-axis")
    if known is not None:
        return known
    register = procedure(
        "tests.neutral-axis",
        1,
        "equilibrium of the section by bisection",
        ("A_s", "f_y", "b", "f_c"),
    )
    return register(lambda A_s, f_y, b, f_c: 0.85 * A_s * f_y / (0.802 * 0.65 * f_c * b * 0.89))


def made_sheet(*, d_bars: int = 4, accepted: bool = False) -> Sheet:
    """Return the sheet of beam B7; with two bars its resistance does not suffice."""
    sheet = Sheet("B7", "Gallery floor beam B7", project=PROJECT, notation=NOTATION)
    sheet.codes = {
        "pair": "NBC 2015 + A23.3-14",
        "building": "NBC 2015",
        "concrete": "CSA A23.3-14",
    }
    sheet.member = "floor beam, one simple span"
    sheet.scope = "preliminary: flexure only"
    sheet.not_covered = [
        {"check": "Shear", "clause": "11.3"},
        {"check": "Deflection", "clause": "9.8"},
        {"check": "Anchorage of bars", "clause": "12"},
    ]
    _inputs(sheet)
    _materials(sheet)
    _loads(sheet)
    _section(sheet, d_bars)
    _flexure(sheet, accepted=accepted)
    _crack(sheet)
    return sheet


def _inputs(sheet: Sheet) -> None:
    with sheet.part("inputs", "Given"):
        sheet.given("L", "7.6 m", source="drawing S-201")
        sheet.given("s_b", "3.1 m", source="drawing S-201")
        sheet.given("b_w", "380 mm")
        sheet.given("h", "24.4 in")
        sheet.given("h_f", "140 mm", source="drawing A-210")
        sheet.given("c_c", "40 mm", clause="7.9", basis="from memory: exposure N with 2 h rating")
        sheet.given("p_L", "4.8 kPa", clause="4.1.5.3", basis="NBC 2015 table 4.1.5.3")
        sheet.given("p_SD", "1.8 kPa", source="architect's letter of 2026-09-14")
        sheet.given("gamma_c", "24 kN/m3", basis="common practice")


def _materials(sheet: Sheet) -> None:
    memory = "from memory"
    with sheet.part("materials", "Materials"):
        sheet.given("f_c", "32 MPa")
        sheet.given("f_y", "400 MPa", clause="8.5.1")
        sheet.given("phi_c", "0.65", clause="8.4.2", unit="")
        sheet.given("phi_s", "0.85", clause="8.4.3", unit="", basis=memory)
        sheet.given("lambda_", "1", clause="8.6.5", unit="", basis=memory)
        for text, clause, numbers in (
            ("alpha_1 = max(0.85 - 0.0015*f_c, 0.67)", "10.1.7", {"0.0015": "1/MPa"}),
            ("beta_1 = max(0.97 - 0.0025*f_c, 0.67)", "10.1.7", {"0.0025": "1/MPa"}),
            ("f_r = 0.6*lambda_*sqrt(f_c)", "8.6.4", {"0.6": "MPa^0.5"}),
            ("E_c = 4500*sqrt(f_c)", "8.6.2.3", {"4500": "MPa^0.5"}),
        ):
            sheet.line(
                formula(text, clause=clause, basis=memory, numbers=numbers, notation=NOTATION)
            )


def _loads(sheet: Sheet) -> None:
    def load(text: str, title: str, clause: str = "") -> None:
        sheet.line(formula(text, clause=clause, title=title, system="kN-m", notation=NOTATION))

    with sheet.part("loads", "Loads and factored moment"):
        load("w_slab = gamma_c*h_f*s_b", "Slab over the tributary width")
        load("w_web = gamma_c*b_w*(h - h_f)", "Web below the slab")
        load("w_D = w_slab + w_web + p_SD*s_b", "Dead load")
        load("w_L = p_L*s_b", "Live load", "4.1.5.3")
        load("w_f = max(1.4*w_D, 1.25*w_D + 1.5*w_L)", "Factored load, cases 1 and 2", "4.1.3.2")
        load("M_f = w_f*L**2/8", "Factored moment at midspan")
        drawn = loading_figure(
            7600,
            [
                UniformLoad("dead load", 24.1, "24.1 kN/m"),
                UniformLoad("live load", 14.9, "14.9 kN/m"),
            ],
        )
        sheet.figure(
            "loading", to_json(drawn), title="Loading of beam B7", alt="Simple span of 7.6 m, loads"
        )


def _section(sheet: Sheet, count: int) -> None:
    with sheet.part("section", "Section and steel"):
        sheet.lookup("d_b", BARS, "25M", title="diameter of 25M")
        sheet.lookup("A_b", BARS, "25M", title="area of 25M")
        sheet.lookup("d_st", BARS, "10M", "d_b", title="diameter of 10M stirrup")
        sheet.given("n_b", str(count), "number of bars", unit="")
        sheet.line(formula("A_s = n_b*A_b", title="Steel provided", notation=NOTATION))
        sheet.line(
            formula("d = h - c_c - d_st - d_b/2", title="Depth to the steel", notation=NOTATION)
        )
        sheet.line(
            formula(
                "b = b_w + 2*min(L/5, 12*h_f, (s_b - b_w)/2)", title="Effective width of flange",
                clause="10.3.3", basis="from memory", notation=NOTATION,
            )
        )  # fmt: skip
        drawn = section_figure(
            SectionShape("T", 380, 620, 3100, 140), d=556, cover=40, stirrup_diameter=11.3,
            stirrup_label="10M stirrup", bottom=[BarRow(count, 25.2, 556, f"{count}-25M")],
        )  # fmt: skip
        sheet.figure(
            "section", to_json(drawn), title="Section at midspan, 1:10", alt="T-section with bars"
        )


def _flexure(sheet: Sheet, *, accepted: bool) -> None:
    with sheet.part("flexure", "Flexure at midspan"):
        sheet.note("scope", "Gravity loads only; compression steel is neglected.")
        sheet.line(
            formula(
                "a = phi_s*A_s*f_y/(alpha_1*phi_c*f_c*b)", clause="10.1.7",
                title="Depth of the stress block", notation=NOTATION,
            )
        )  # fmt: skip
        sheet.decide(
            criterion(
                "a <= h_f", clause="10.1.7", title="Is the block in the flange?", key="block",
                yes="The stress block lies in the flange: rectangular section of width b.",
                no="The stress block reaches into the web.", notation=NOTATION,
            )
        )  # fmt: skip
        sheet.line(
            formula("c = a/beta_1", clause="10.1.7", title="Neutral axis", notation=NOTATION)
        )
        sheet.check(
            criterion(
                "c/d <= 700/(700 + f_y)", unit="", clause="10.5.2", title="Steel yields first",
                key="yields", numbers={"700": "MPa"},
                yes="The steel yields before the concrete fails.",
                no="The concrete would fail before the steel yields.", notation=NOTATION,
            )
        )  # fmt: skip
        sheet.line(
            formula(
                "M_r = phi_s*A_s*f_y*(d - a/2)", clause="10.1.7", title="Moment resistance",
                notation=NOTATION,
            )
        )  # fmt: skip
        sheet.check(
            criterion(
                "M_f <= M_r", clause="8.1.3", title="Moment resistance", key="moment",
                yes="The steel chosen suffices.", no="The steel chosen does not suffice.",
                notation=NOTATION,
            ),
            accepted="temporary stage only, shored" if accepted else "",
            initials="A.V." if accepted else "",
        )  # fmt: skip
        sheet.found(
            "c_n", _neutral_axis(),
            criterion("abs(c_n - c) <= 0.05*c", unit="mm", notation=NOTATION),
            unit="mm", title="Neutral axis by a second path",
        )  # fmt: skip


def _crack(sheet: Sheet) -> None:
    with sheet.part("minimum", "Minimum steel"):
        sheet.line(
            formula(
                "A_s_min = 0.2*sqrt(f_c)/f_y*b_w*h", clause="10.5.1.2", title="Minimum steel",
                basis="from memory", numbers={"0.2": "MPa^0.5"}, notation=NOTATION,
            )
        )  # fmt: skip
        sheet.check(
            criterion(
                "A_s >= A_s_min", clause="10.5.1.2", title="Minimum steel", key="minimum",
                yes="More steel than the minimum.", no="Less steel than the minimum.",
                notation=NOTATION,
            )
        )  # fmt: skip
        sheet.line(
            formula("I_g = b_w*h**3/12", title="Web alone, gross section", notation=NOTATION)
        )
        sheet.line(
            formula("M_cr = f_r*I_g/(h/2)", title="Cracking moment of the web", notation=NOTATION)
        )
        sheet.table(
            "steps",
            ["Part of balanced steel", "A_s, mm2", "M_r, kN.m"],
            [["25 %", "12500", "1010"], ["50 %", "25000", "1870"], ["100 %", "50000", "3.02e3"]],
            title="Resistance for other amounts of steel",
        )


@pytest.fixture(scope="session")
def whole_record() -> dict[str, Any]:
    """Return the data of a beam whose checks hold."""
    return made_sheet(d_bars=6).close().data


@pytest.fixture
def record(whole_record: dict[str, Any]) -> dict[str, Any]:
    """Return a copy to change at will."""
    return copy.deepcopy(whole_record)


@pytest.fixture(scope="session")
def failing_record() -> dict[str, Any]:
    """Return the data of a beam whose moment check fails."""
    return made_sheet(d_bars=2).close().data


@pytest.fixture(scope="session")
def accepted_record() -> dict[str, Any]:
    """Return the same beam with the failing check accepted by the engineer."""
    return made_sheet(d_bars=2, accepted=True).close().data
