"""Rows of tables whose height is told instead of measured: only such as are surely one line."""

from __future__ import annotations

import datetime as dt
import json

import pytest

from lineproof.beams.continuous.summary_tables import FLEXURE, FLEXURE_WIDTHS, SHEAR, SHEAR_WIDTHS
from lineproof.beams.continuous.summary_torsion import TORSION, TORSION_WIDTHS
from lineproof.package.environment import _text_size
from lineproof.package.pdf import PrintError, compile_pdf
from lineproof.package.row_heights import PAPER, row_heights, table_heights, widest
from lineproof.resources import folder
from lineproof.typeset.nodes import Letter, Math, Word
from lineproof.typeset.rows import PrintedTable

DATE = dt.date(2026, 1, 1)
SETUP = (
    '#set document(title: "t", date: datetime(year: 2026, month: 1, day: 1))\n'
    '#set text(font: ("Libertinus Serif", "STIX Two Math"), size: 10pt, fallback: false)\n'
    "#let t = json(bytes(sys.inputs.texts))\n"
)


def covered() -> list[str]:
    """Return every character that the fonts can print."""
    spans = (folder("templates") / "fonts" / "coverage.txt").read_text().split()
    ends = [[int(end, 16) for end in span.split("-")] for span in spans]
    return [chr(c) for first, *last in ends for c in range(first, (last or [first])[0] + 1)]


def test_no_letter_is_wider_than_told() -> None:
    """Typst's own measure of each character, regular and bold, against the bound."""
    bounds = [[letter, widest(letter)] for letter in covered()]
    source = SETUP + (
        "#context for (letter, bound) in t { for shown in (text(letter), strong(letter)) {\n"
        '  assert(measure(shown).width <= bound * 10pt, message: "wider: " + letter)\n} }'
    )

    assert compile_pdf(source, json.dumps(bounds), DATE).startswith(b"%PDF")
    with pytest.raises(PrintError, match="wider"):
        compile_pdf(source, json.dumps([["a", 0.4]]), DATE)


def test_a_line_is_as_high_as_the_template_says() -> None:
    """``line-height`` of the template is that of a line of text, to 0.01 pt at 10 pt."""
    template = (folder("templates") / "package.typ").read_text()
    told = next(line for line in template.splitlines() if line.startswith("#let line-height"))
    check = 'assert(calc.abs(measure("Hg").height - line-height.to-absolute()) < 0.01pt)'
    source = f"{SETUP}{told}\n#context {check}"

    assert compile_pdf(source, "[]", DATE).startswith(b"%PDF")


def test_a_cell_that_may_wrap_leaves_its_row_measured() -> None:
    """20 mm less 7 pt are 49.7 pt: room for seven letters of at most 6.5 pt, not for eight."""
    fits, wraps = "n" * 7, "n" * 8
    rows = [("Head", "Head"), (fits, "1"), (wraps, "1"), ("1", "1")]

    assert row_heights(rows, ("20", "20"), 10.0, 3.5) == "101"


def test_columns_as_wide_as_their_texts_share_the_paper() -> None:
    """Where all fit, no text wraps; where they do not, each has at least its equal share."""
    short = [("A", "B"), ("n" * 20, "n" * 53)]  # 73 x 6.5 pt + 14 pt = 489 pt of 493 pt
    long = [("A", "B"), ("n" * 20, "n" * 54), ("n" * 20, "1")]

    assert row_heights(short, ("", ""), 10.0, 3.5) == "1"
    assert row_heights(long, ("", ""), 10.0, 3.5) == "01"


def test_what_is_left_goes_to_the_open_column() -> None:
    """174 mm less 24 mm on both sides leave 126 mm, 357 pt, less 7 pt: 53 letters "n"."""
    rows: list[tuple[str | Math, ...]] = [("", "", "")]
    rows += [(Letter("a"), "n" * count, "mm") for count in (53, 54)]

    assert PAPER == 174
    assert row_heights(rows, ("24", "1fr", "24"), 10.0, 3.5) == "10"


def test_a_table_in_the_working_leaves_the_clauses_their_column() -> None:
    """154 mm are 436 pt, 174 mm 493 pt; the texts want 70 x 6.5 pt + 14 pt = 469 pt."""
    table = PrintedTable((Word("A"), Word("B")), (("n" * 20, "n" * 50),), (False,) * 2, ("", ""))

    assert table_heights(table, "10", working=False) == "1"
    assert table_heights(table, "10", working=True) == "0"


def test_an_index_stays_within_its_row() -> None:
    """Typst's own measure of what an index with tails reaches below its line: room for it."""
    template = (folder("templates") / "package.typ").read_text()
    told = next(line for line in template.splitlines() if line.startswith("#let below-index"))
    check = (
        'let high(it) = measure(text(top-edge: "bounds", bottom-edge: "bounds", it)).height\n'
        'let drop = high($M_upright("lay,j")$) - high($M$)\n'
        "assert(drop > 3pt and drop + 1pt < below-index.to-absolute())"
    )
    source = f"{SETUP}{told}\n#context {{ {check} }}"

    assert compile_pdf(source, "[]", DATE).startswith(b"%PDF")


def test_a_mark_above_an_index_stands_beside_its_letter() -> None:
    """As high as the same symbol written in Typst's own way, which sets the minus beside the M."""
    formula = [["letter", "M"], ["word", "cr"], ["word", "−"], ["scripts", 0, 1, 2]]
    maths = (folder("templates") / "maths.typ").read_text()
    setup = SETUP.replace("#let t = json(bytes(sys.inputs.texts))\n", "")
    check = (
        'let high(it) = measure(text(top-edge: "bounds", bottom-edge: "bounds", it)).height\n'
        'let typed = $M_upright("cr")^upright("−")$\n'
        "assert(calc.abs(high(t.x4) - high(typed)) < 0.01pt)"
    )
    source = f"{setup}{maths}\n#context {{ {check} }}"

    texts = json.dumps([*formula, ["formula", 3, "moment"]])
    assert compile_pdf(source, texts, DATE).startswith(b"%PDF")


@pytest.mark.parametrize(
    ("columns", "widths"),
    [(FLEXURE, FLEXURE_WIDTHS), (SHEAR, SHEAR_WIDTHS), (TORSION, TORSION_WIDTHS)],
)
def test_a_failing_ratio_runs_into_no_other_column(
    columns: list[str], widths: tuple[float, ...]
) -> None:
    """What the fixed columns of A4 leave holds a ratio that fails and the number of its line."""
    size = float(_text_size(len(columns) + 1))
    inset = 2.8 if len(columns) + 1 > 10 else 3.5
    ratios = [head for head, width in zip(columns, widths, strict=True) if not width]
    needed = (widest("1.24 FAILS") * size + 2 * inset) * len(ratios)
    needed += widest("99.99") * size + 2 * inset

    assert columns[-1] in ratios
    assert sum(widths) + needed * 25.4 / 72 <= PAPER
