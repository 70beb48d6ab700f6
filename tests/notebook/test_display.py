from __future__ import annotations

import base64
import re
import subprocess
import sys
from html.parser import HTMLParser
from typing import Any

import pytest

import lineproof
from lineproof.drawing import Figure, Line, to_json
from lineproof.errors import UserError
from lineproof.notebook.display import (
    ANCHOR,
    METADATA,
    bundle,
    cell_hash,
    changed_since,
    refuse_replaced,
    register,
)
from lineproof.sheet import PartView, Sheet

from ..beams.continuous.flow import start  # noqa: TID252 - the beam of all tests of the flow

# Tags and attributes that JupyterLab leaves in untrusted HTML (its packages/apputils sanitizer).
KEPT_TAGS = {
    "p", "strong", "em", "small", "span", "br", "img",
    "table", "thead", "tbody", "tr", "th", "td",
}  # fmt: skip
KEPT_ATTRIBUTES = {"class", "style", "src", "alt"}


class Strict(HTMLParser):
    """Collects tags, attributes and text; text inside class mathjax_ignore apart."""

    def __init__(self, html: str) -> None:
        super().__init__()
        self.tags: set[str] = set()
        self.attributes: set[str] = set()
        self.pictures: list[dict[str, str | None]] = []
        self.text = ""
        self.feed(html)

    def handle_starttag(self, tag: str, attrs: list[tuple[str, str | None]]) -> None:
        self.tags.add(tag)
        self.attributes |= {name for name, _ in attrs}
        if tag == "img":
            self.pictures.append(dict(attrs))
        if tag in ("br", "tr", "td"):
            self.text += "\n"

    def handle_data(self, data: str) -> None:
        self.text += data


def beam_sheet(A_s: str = "2500 mm2", title: str = "Flexure at midspan") -> Sheet:
    sheet = Sheet("B1", "Beam")
    with sheet.part("data", "Data"):
        for name, typed in {
            "b": "1900 mm", "d": "550 mm", "f_c": "32 MPa", "f_y": "400 MPa", "phi_c": "0.65",
            "phi_s": "0.85", "alpha_1": "0.802", "M_f": "385 kN.m", "A_s": A_s,
        }.items():  # fmt: skip
            sheet.given(name, typed)
    with sheet.part("flexure", title):
        sheet.line("a = phi_s*A_s*f_y/(alpha_1*phi_c*f_c*b)", unit="mm")
        sheet.line("M_r = phi_s*A_s*f_y*(d - a/2)", unit="kN.m", title="Moment resistance")
        sheet.check("M_f <= M_r", title="Steel suffices")
        sheet.table("steps", ["M_r, kN.m", "steel"], [["-12500", "4-25M"]], title="Other steel")
    return sheet


def data_of(sheet: Sheet, key: str = "flexure") -> dict[str, Any]:
    return bundle(PartView(sheet, key))[0]


def test_a_part_is_shown_as_html_text_and_anchor() -> None:
    assert set(data_of(beam_sheet())) == {ANCHOR, "text/html", "text/plain"}
    assert data_of(beam_sheet())[ANCHOR] == {"part": "flexure"}


def test_only_tags_that_survive_an_untrusted_notebook_are_used() -> None:
    page = Strict(data_of(beam_sheet())["text/html"])
    assert page.tags <= KEPT_TAGS
    assert page.attributes <= KEPT_ATTRIBUTES


def test_fractions_keep_their_meaning_when_every_tag_is_dropped() -> None:
    text = Strict(data_of(beam_sheet())["text/html"]).text
    assert r"\frac{a}{2}" in text
    assert r"\frac{26.8}{2}" in text
    assert "a2" not in text.replace(" ", "")


def test_the_plain_text_reads_like_the_calc() -> None:
    # By hand: 0.85 x 2500 x 400 = 850000 N; 850000 x (550 - 26.82/2) = 456.1e6 N.mm; 385/456.1.
    text = data_of(beam_sheet())["text/plain"]
    assert text.startswith("2  Flexure at midspan\n")
    assert "\n    M_r = 456 kN.m\n" in text
    assert "M_f = 385 kN.m <= M_r = 456 kN.m" in text
    assert re.search(r"holds, ratio 0\.84(?!\d)", text)


def test_only_printed_digits_are_shown() -> None:
    data = data_of(beam_sheet())
    for shown in (data["text/html"], data["text/plain"]):
        assert not re.search(r"456\.1|26\.81|0\.84\d{2}", shown)


def test_the_same_part_is_shown_the_same_each_time() -> None:
    assert bundle(PartView(beam_sheet(), "flexure")) == bundle(PartView(beam_sheet(), "flexure"))


def test_titles_are_shown_literally() -> None:
    title = r"<script>alert(1)</script> $5$ \(x\) {{ y }} & 'z'"
    data = data_of(beam_sheet(title=title))
    page = Strict(data["text/html"])
    assert title in page.text
    assert "script" not in page.tags
    assert title in data["text/plain"]
    # MathJax leaves elements of this class alone, so neither "$5$" nor "\(x\)" becomes a formula.
    assert '<strong class="mathjax_ignore">2 &lt;script&gt;' in data["text/html"]


def test_control_characters_are_shown_by_their_code() -> None:
    data = data_of(beam_sheet(title="Flexure \x1b[31m"))
    assert "<U+001B>[31m" in data["text/plain"]
    assert "\x1b" not in data["text/html"]


def test_a_table_has_true_minus_signs_and_typeset_headings() -> None:
    html = data_of(beam_sheet())["text/html"]
    assert ">−12\u202f500</td>" in html
    assert r"\(\displaystyle M_{\mathrm{r}}" in html


def test_a_figure_is_a_picture_with_its_alternative_text() -> None:
    sheet = Sheet("B1")
    drawn = Figure(20, 10, 1, (0, 0), (Line((0, 0), (20, 10)),), alt="A line", caption="Line")
    with sheet.part("figures", "Figures"):
        sheet.figure("line", to_json(drawn), title="The <line>", alt='A "line"')
    data = data_of(sheet, "figures")
    (picture,) = Strict(data["text/html"]).pictures
    head, _, body = str(picture["src"]).partition(",")
    assert head == "data:image/svg+xml;base64"
    assert b"<svg" in base64.b64decode(body)
    assert picture["alt"] == 'A "line"'
    assert '[figure: A "line"]' in data["text/plain"]


def test_a_part_run_again_keeps_its_number() -> None:
    sheet = beam_sheet()
    with sheet.part("data", "Data"):
        sheet.given("b", "2000 mm")
    assert data_of(sheet, "data")["text/plain"].startswith("1  Data\n")


def test_the_metadata_tell_what_the_part_was_made_from() -> None:
    def note(sheet: Sheet) -> Any:
        return bundle(PartView(sheet, "flexure"), ran=["abc"])[1][METADATA]

    first = note(beam_sheet())
    assert first["cells"] == ["abc"]
    assert first["part"] != note(beam_sheet(A_s="2600 mm2"))["part"]
    assert first["part"] == note(beam_sheet(title="Another title"))["part"]


def test_white_space_around_a_cell_does_not_change_its_hash() -> None:
    assert cell_hash("a = 1\n") == cell_hash("\n  a = 1 ".strip())
    assert cell_hash("a = 1") != cell_hash("a = 2")


def test_nothing_is_registered_outside_a_notebook() -> None:
    assert register() is False
    assert Sheet.shown is None


def run_python(code: str) -> str:
    done = subprocess.run(
        [sys.executable, "-c", code], capture_output=True, text=True, check=True, timeout=60
    )
    return done.stdout.strip()


def test_importing_lineproof_imports_nothing_heavy() -> None:
    heavy = {"numpy", "sympy", "pint", "typst", "jinja2", "IPython", "nbconvert", "nbclient"}
    loaded = run_python("import lineproof, sys; print(' '.join(sys.modules))").split()
    assert not heavy & set(loaded)


def test_notebooks_are_run_without_the_grammars_of_web_addresses() -> None:
    """They take over a second to compile; notebooks are still checked, later imports find them."""
    code = """
import sys
from lineproof.notebook.light_import import without_grammars
with without_grammars():
    import nbformat
print("lark" in sys.modules, "rfc3987_syntax" in sys.modules)
try:
    nbformat.validate({"nbformat": 4, "nbformat_minor": 5, "metadata": 1, "cells": []})
except nbformat.ValidationError:
    print("checked")
import rfc3987_syntax
print("lark" in sys.modules)
"""
    assert run_python(code).split() == ["False", "False", "checked", "True"]


def test_lineproof_offers_sheet_and_beams_on_first_use() -> None:
    code = "import lineproof as l; print(l.Sheet.__name__, l.beams.__name__, hasattr(l, 'x'))"
    assert run_python(code) == "Sheet lineproof.beams False"


def test_inside_ipython_parts_are_shown_at_once() -> None:
    code = """
from IPython.core.interactiveshell import InteractiveShell
InteractiveShell.instance()
import lineproof
from lineproof.sheet import Sheet
print(Sheet.shown.__module__)
"""
    assert run_python(code) == "lineproof.notebook.display"


def test_a_beam_of_an_earlier_sheet_shows_nothing_below_new_inputs() -> None:
    """The start cell opened a new sheet and was refused: ``beam`` is still the one before it."""
    before, now = Sheet("B7", "Beam"), Sheet("B7", "Beam")
    with pytest.raises(UserError, match="B7: this rests on a sheet from before the inputs were"):
        refuse_replaced(before, {"sheet": now, "_3": before})
    refuse_replaced(now, {"sheet": now, "_3": before})
    refuse_replaced(before, {"sheet": now, "first": before})
    refuse_replaced(before, {"sheet": Sheet("B8", "Another beam")})
    refuse_replaced(before, {})


def test_inputs_changed_without_the_start_cell_are_told() -> None:
    """Of ``h`` the notebook holds something else from the start: it is not the input."""
    sheet = Sheet("B7", "Beam")
    sheet.typed = {"spans": ["7.6 m", "9.2 m"], "h": "620 mm", "f_c": "32 MPa", "cover": "30 mm"}
    names: dict[str, object] = {"spans": ["7.6 m", "9.2 m"], "h": 5, "f_c": "32 MPa"}
    assert changed_since(sheet, names) == []
    now = names | {"spans": ["7.6 m", "9.4 m"], "h": 6, "cover": "40 mm"}
    [told] = changed_since(sheet, now)
    assert told.startswith("spans is ['7.6 m', '9.4 m'] now, but what follows rests on ['7.6 m', ")
    assert told.endswith("run the cell that starts the calculation again")
    sheet.typed = dict(sheet.typed, spans=["7.6 m", "9.4 m"])  # started again
    assert changed_since(sheet, now) == []


def test_a_beam_keeps_its_inputs_as_typed() -> None:
    """A list that is changed in place is another value as well."""
    spans = ["7.6 m", "9.2 m", "7.6 m"]
    beam = start(spans=spans)
    names = {"spans": spans}
    assert changed_since(beam.sheet, names) == []
    spans[1] = "9.4 m"
    assert len(changed_since(beam.sheet, names)) == 1


def test_unknown_names_of_lineproof_are_refused() -> None:
    with pytest.raises(AttributeError, match="Beams"):
        _ = lineproof.Beams
