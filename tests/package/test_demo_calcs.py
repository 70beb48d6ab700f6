"""What the stored calcs hand over: length of their summaries, drawings that other programs open."""

from __future__ import annotations

import io
import re
from typing import Any

import pypdf
import pytest
from ezdxf.filemanagement import read

from lineproof.notebook.read import read_calc
from lineproof.package import build_package, calc_files, to_pdf
from lineproof.resources import folder

CALCS = ("floor-beam", "edge-beam", "existing-beam")


@pytest.fixture(scope="module", params=CALCS)
def calc(request: pytest.FixtureRequest) -> Any:
    """A stored calc of a beam of several spans."""
    return read_calc(folder("calcs") / f"{request.param}.ipynb")


def test_the_summary_has_six_to_ten_pages(calc: Any) -> None:
    """From its heading to that of the working, by the bookmarks of the PDF."""
    content = to_pdf(build_package([calc.record], [calc.walk]))
    reader = pypdf.PdfReader(io.BytesIO(content))
    starts: dict[str, int] = {}
    for mark in reader.outline:
        if not isinstance(mark, list):
            number = reader.get_destination_page_number(mark)
            assert number is not None
            starts[str(mark.title).partition(",")[0]] = number
    assert 6 <= starts["Working"] - starts["Summary"] <= 10
    assert starts["Working"] < starts["Notation"]


def test_every_drawing_is_opened_without_a_fault(calc: Any) -> None:
    """The elevation and at least one section; nothing to mend, and dimensions in each."""
    made = {
        name: read(io.StringIO(content.decode()))
        for name, content in calc_files(calc.record.data).items()
        if name.endswith(".dxf")
    }
    kinds = {name.partition("-")[2].removesuffix(".dxf") for name in made}
    assert {"elevation", "section-a"} <= kinds
    for name, document in made.items():
        audit = document.audit()
        assert (audit.errors, audit.fixes) == ([], []), name
        assert len(document.modelspace().query("DIMENSION")) > 0, name


def test_no_symbol_is_printed_raw(calc: Any) -> None:
    """Words of notes and titles say ``the effective depth``, not ``d_v``; formulas are set."""
    raw = [
        text
        for part in calc.record.data["parts"]
        for entry in part["entries"]
        for text in (part["title"], entry.get("title", ""), entry.get("text", ""))
        if entry["kind"] != "prose" and re.search(r"\b[A-Za-z]+_[A-Za-z0-9]+\b", text)
    ]
    # a lateral storage case takes the name that its load has in the list of loads
    assert [text for text in raw if not re.search(r"L_st|S_[a-z]", text)] == []


def test_bars_as_built_are_not_called_chosen(calc: Any) -> None:
    """Bars told along the beam are given; where none are told, they are chosen."""
    origins = {
        "given" if "given along the beam" in entry["text"] else "chosen"
        for part in calc.record.data["parts"]
        for entry in part["entries"]
        if entry["kind"] == "note" and entry.get("title") == "Bars"
        and part["key"].startswith(("sag-", "hog-"))
    }  # fmt: skip
    assert origins == {"given" if "existing" in calc.name else "chosen"}
