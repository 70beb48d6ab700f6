"""A table that goes on below a drawing: its head is said again there, not at the top of the page.

A drawing floats to the head of a page. Marks are written by hand: of the drawing, at 700 points
from below, of a head said again and a row below it.
"""

from __future__ import annotations

import io

import pypdf
from tests.audit.hand import sheet_of

from lineproof.audit.verify.page import Kind, Mark, Zone
from lineproof.audit.verify.printed import compare_pages
from lineproof.audit.verify.verification import Outcome, verify
from lineproof.drawing import Figure, Line, Text, to_json
from lineproof.drawing.shapes import words
from lineproof.package import build_package, to_pdf

ROWS = 60
DRAWING = Mark(1, Kind.TEXT, Zone.BODY, 0, 100.0, 700.0, "all loads", 9.0)
HEAD = Mark(2, Kind.TEXT, Zone.AGAIN, 0, 50.0, 500.0, "Place", 9.0)
ROW = Mark(3, Kind.TEXT, Zone.BODY, 0, 50.0, 480.0, "span 1", 9.0)


def told(given: list[Mark]) -> list[str]:
    found = compare_pages([DRAWING, HEAD, ROW], given, [], [1])
    return [altered.sentence for altered in found.alterations]


def test_a_head_below_a_drawing_where_the_record_prints_it() -> None:
    assert told([DRAWING, HEAD, ROW]) == []


def test_a_head_elsewhere_on_the_page() -> None:
    (sentence,) = told([DRAWING, HEAD._replace(y=300.0), ROW])
    assert "the running head “Place” is not that of the record" in sentence


def test_another_head_there() -> None:
    (sentence,) = told([DRAWING, HEAD._replace(key=4, text="Ratio"), ROW])
    assert "the running head “Ratio” is not that of the record" in sentence


def test_a_table_that_goes_on_below_a_drawing_is_intact() -> None:
    """A package with a table of two pages and, behind it, a drawing with text."""
    sheet = sheet_of()
    rows = [[f"B{n}", f"{n}-20M", f"{6000 + n}"] for n in range(1, ROWS + 1)]
    shapes = (Line((0, 0), (400, 0)), Text((200, 60), words("all loads")))
    drawn = Figure(100, 60, 0.1, (10, 10), shapes, "All loads")
    with sheet.part("strength", "Strength"):
        sheet.check("M_f <= M_r", key="strength", title="Moment resistance")
        sheet.table("bars", ["Mark", "Bars", "Length, mm"], rows, title="Bars", front=1)
        sheet.figure("loads", to_json(drawn), title="All loads", alt="All loads", front=2)
    made = to_pdf(build_package([sheet.close()]))
    pages = [page.extract_text() for page in pypdf.PdfReader(io.BytesIO(made)).pages]
    (page,) = [text for text in pages if "all loads" in text]
    assert page.index("all loads") < page.index("Mark")  # else nothing is tried here

    found = verify(made, "beam.pdf")

    assert (found.outcome, found.alterations) == (Outcome.INTACT, ())
