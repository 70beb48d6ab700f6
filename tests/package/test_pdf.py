"""The PDF: archival, tagged, with its record, and the same bytes every time."""

from __future__ import annotations

import copy
import io
import json
import re
import unicodedata
from concurrent.futures import ThreadPoolExecutor
from dataclasses import replace
from typing import Any

import pypdf
import pytest

from lineproof.errors import UserError
from lineproof.package import build_package, records_in_pdf, to_pdf
from lineproof.package.pdf import PrintError, compile_pdf
from lineproof.package.summary import Confirmation
from lineproof.resources import folder
from lineproof.sheet import Sheet

from .noted import noted

Record = dict[str, Any]


def printed(*records: Record, **options: Any) -> bytes:
    """Return the PDF of records."""
    return to_pdf(build_package(list(records), **options))


def text_of(content: bytes) -> str:
    """Return the text of all pages, folded to one line."""
    pages = pypdf.PdfReader(io.BytesIO(content)).pages
    return " ".join(" ".join(page.extract_text() for page in pages).split())


def letters(text: str) -> str:
    """Return text without any space, since a line may break anywhere."""
    return re.sub(r"\s", "", unicodedata.normalize("NFKC", text))


@pytest.fixture(scope="module")
def content(whole_record: Record) -> bytes:
    """Return the PDF of the beam whose checks hold."""
    return printed(whole_record)


def test_pdf_is_tagged_and_archival(content: bytes) -> None:
    """Structure tree, language, associated file and the standards' own marks are there."""
    root: Any = pypdf.PdfReader(io.BytesIO(content), strict=True).root_object
    metadata = root["/Metadata"].get_object().get_data().decode()

    assert "/StructTreeRoot" in root
    # Suspects is false by default; readers call the false itself an object of the wrong type.
    assert dict(root["/MarkInfo"]) == {"/Marked": True}
    assert str(root["/Lang"]).startswith("en")
    assert root["/AF"]
    assert re.search(r"pdfaid:part\W+3", metadata)
    assert re.search(r"pdfaid:conformance\W+A", metadata)
    assert re.search(r"pdfuaid:part\W+1", metadata)


def test_attached_record_reads_back_equal(content: bytes, whole_record: Record) -> None:
    """What was printed is what travels inside."""
    assert records_in_pdf(content) == [whole_record]


def test_attachment_is_named_and_described(content: bytes) -> None:
    """Name, type, relationship and description follow the contract."""
    root: Any = pypdf.PdfReader(io.BytesIO(content)).root_object
    file = root["/AF"][0].get_object()
    stream = file["/EF"]["/F"].get_object()

    assert file["/UF"] == "B7.lineproof.json"
    assert file["/AFRelationship"] == "/Data"
    assert "B7" in file["/Desc"]
    assert stream["/Subtype"] == "/application/vnd.lineproof.record+json"


def test_printing_twice_gives_the_same_bytes(content: bytes, whole_record: Record) -> None:
    """Also from a record that was read back from JSON, and from another thread."""
    again = json.loads(json.dumps(whole_record))
    with ThreadPoolExecutor(2) as pool:
        threads = list(pool.map(printed, [again, whole_record]))

    assert threads == [content, content]


def test_text_holds_every_clause_label_and_title(content: bytes, whole_record: Record) -> None:
    """Nothing of the record is left out."""
    text = letters(text_of(content))
    for part in whole_record["parts"]:
        assert letters(part["title"]) in text
        for entry in part["entries"]:
            assert letters(entry["clause"]) in text
            assert letters(entry["label"]) in text
            # Titles begin with a capital in print.
            assert letters(entry["title"])[1:] in text


def test_text_holds_results_and_notation(content: bytes, whole_record: Record) -> None:
    """Printed results and the meanings of symbols are there."""
    text = letters(text_of(content))
    for part in whole_record["parts"]:
        for entry in part["entries"]:
            result = (entry.get("printed") or {}).get("result", "")
            if result.isdigit():
                assert result in text
    for symbol in whole_record["notation"]:
        assert letters(symbol["meaning"]) in text


def test_cover_says_what_is_preliminary_and_not_covered(content: bytes) -> None:
    """Scope, what is missing and the seal stand on the first page."""
    cover = pypdf.PdfReader(io.BytesIO(content)).pages[0].extract_text()

    for said in ("preliminary: flexure only", "Shear (11.3)", "Anchorage of bars (12)",
                 "Northrow Structural Ltd.", "P-00000", "Seal of the licensed engineer",
                 "S-201", "NBC 2015 + A23.3-14", "Revision A, 2026-10-02"):  # fmt: skip
        assert said in " ".join(cover.split())


def test_failing_check_stands_on_the_cover(failing_record: Record) -> None:
    """A package in which a check fails says so at once, in words."""
    cover = pypdf.PdfReader(io.BytesIO(printed(failing_record))).pages[0].extract_text()

    assert "1 check does not hold" in " ".join(cover.split())
    assert "Moment resistance" in cover


def test_accepted_exception_is_still_on_the_cover(accepted_record: Record) -> None:
    """The engineer's exception is named as such, with reason and initials in the working."""
    content = printed(accepted_record)
    cover = pypdf.PdfReader(io.BytesIO(content)).pages[0].extract_text()

    assert "exception accepted by the engineer" in " ".join(cover.split())
    assert "Exception accepted by A.V.: temporary stage only, shored." in text_of(content)


def test_holding_package_has_no_failure_line(content: bytes) -> None:
    """No loud line without a cause."""
    assert "does not hold" not in text_of(content)


HOSTILE = [
    "<script>alert(1)</script>",
    '#let x = 1; #panic("ran") #sys.version',
    "$ x^2 $ \\ \\frac{a}{b} \\n",
    "*bold* _it_ `raw` = head - item / term @ref <label> // no /* no */",
    "\"quotes\" 'single' {{ 7*7 }} {% raw %} ~ [link](x)",
    't.x0 ") + read("/etc/passwd")',
]


@pytest.mark.parametrize("title", HOSTILE)
def test_hostile_titles_come_out_literally(record: Record, title: str) -> None:
    """No user text is ever Typst source."""
    record["calc"]["title"] = title
    record["project"]["project"]["name"] = title
    record["parts"][0]["title"] = title
    record["parts"][0]["entries"][0]["title"] = title
    content = printed(record)
    text = letters(text_of(content))

    # Typst's own quotes are not made smart and nothing is swallowed.
    assert letters(title) in text
    assert records_in_pdf(content) == [record]


@pytest.mark.parametrize(
    ("title", "shown"),
    [
        ("Hall \U0001f600", "Hall<U+1F600>"),
        ("a\x00b\x07", "a<U+0000>b<U+0007>"),
        ("\u202egnirts\u200f", "<U+202E>gnirts<U+200F>"),
        ("梁の計算", "<U+6881><U+306E><U+8A08><U+7B97>"),
    ],
)
def test_characters_without_a_glyph_are_shown_by_code(
    record: Record, title: str, shown: str
) -> None:
    """A note in the cautions explains the codes."""
    record["calc"]["title"] = title
    text = text_of(printed(record))

    assert shown in letters(text)
    assert "shown by their code" in text


@pytest.mark.parametrize("lines", [30, 38, 46])
def test_the_heads_of_the_working_do_not_stand_over_the_notation(lines: int) -> None:
    """Of 38 lines the working fills its page, and the notation begins the next one alone."""
    alone = lines == 38
    sheet = Sheet("B1", "Widths")
    with sheet.part("given", "Given"):
        for number in range(lines):
            sheet.given(f"b_{number}", "300 mm", f"width {number}")
    pages = pypdf.PdfReader(io.BytesIO(printed(sheet.close().data))).pages
    texts = [" ".join(page.extract_text().split()) for page in pages]
    (first,) = (text for text in texts if "Notation Symbol Meaning Unit" in text)
    before = first[: first.index("Notation Symbol")]
    assert ("Width" in before) != alone
    assert ("Clause Working Result" in before) != alone


@pytest.mark.parametrize("parts", [85, 100])
def test_the_criteria_stand_below_contents_that_leave_them_room(parts: int) -> None:
    """In two columns of one height, of 100 parts set closer; they had a page of their own."""
    rules = {f"rule {n}": "as drawn" for n in range(4)}
    project = {"codes": {"pair": "NBC 2015 + A23.3-14"}, "criteria": rules}
    sheet = Sheet("B1", "Widths", project=project)
    for number in range(parts):
        with sheet.part(f"p{number}", f"Part of width {number}"):
            sheet.given(f"b_{number}", "300 mm", "width")
    pages = pypdf.PdfReader(io.BytesIO(printed(sheet.close().data))).pages
    text = " ".join(pages[1].extract_text().split())
    assert text.count("Design criteria") == 2
    assert f"Part of width {parts - 1} " in text
    assert text.index("Cautions and what is not covered") < text.rindex("Design criteria")
    assert "Design criteria" not in pages[2].extract_text()


def test_a_clause_to_confirm_stands_whole_on_one_page(record: Record) -> None:
    """Forty clauses of four to six lines each, on several pages: none is parted."""
    package = build_package([record])
    items = tuple(
        Confirmation(
            f"9.{n}",
            f"begin{n}z {'words of the rule ' * (10 + n % 7)}end{n}z",
            "from memory",
            "",
            (),
        )
        for n in range(40)
    )
    calc = replace(package.calcs[0], confirm=items)
    reader = pypdf.PdfReader(io.BytesIO(to_pdf(replace(package, calcs=(calc,)))))
    pages = [page.extract_text() for page in reader.pages]
    for n in range(40):
        held = [page for page in pages if f"begin{n}z" in page]
        assert len(held) == 1
        assert f"end{n}z" in held[0]


def test_a_title_of_ten_thousand_characters_is_printed_whole(record: Record) -> None:
    """With and without spaces; running heads are cut with an ellipsis."""
    for title, word, count in (
        ("W" * 10_000, "W", 10_000),
        ("long title " * 909, "longtitle", 909),
    ):
        record["calc"]["title"] = title
        record["project"]["project"]["name"] = title
        reader = pypdf.PdfReader(io.BytesIO(printed(record)))
        text = letters(" ".join(page.extract_text() for page in reader.pages))

        # Both titles are printed in full; heads and headings hold more of the word.
        assert text.count(word) >= 2 * count
        assert "…" in reader.pages[-1].extract_text()
        assert len(reader.pages) < 30
        assert all(right_edge(page) <= 612 for page in reader.pages)


def test_a_word_longer_than_a_pdf_can_hold_is_refused(record: Record) -> None:
    """PDF/A bounds a string at 32767 bytes."""
    record["parts"][0]["title"] = "word " * 7000
    with pytest.raises(UserError, match="more than 32767 characters"):
        printed(record)


def test_several_calcs_take_the_name_of_the_project(record: Record) -> None:
    """Also when the file holds a number there."""
    record["project"]["project"]["name"] = 2611
    other = {**record, "calc": {"id": "B8", "title": "Other"}}
    reader = pypdf.PdfReader(io.BytesIO(printed(record, other)))
    assert reader.metadata is not None
    assert reader.metadata.title == "2611"


def right_edge(page: pypdf.PageObject) -> float:
    """Return how far right the text of a page reaches, in points, by the steps of its lines."""
    starts: list[float] = []

    def visit(text: str, matrix: Any, text_matrix: Any, _font: Any, size: float) -> None:
        x = matrix[4] + text_matrix[4] * abs(matrix[0])
        # A glyph of this font is on average half its size wide; a capital W is one size wide.
        glyphs = text.strip()
        starts.append(x + len(glyphs) * 0.3 * size * abs(matrix[0]) if glyphs else 0.0)

    page.extract_text(visitor_text=visit)
    return max(starts, default=0.0)


def test_every_covered_character_has_a_glyph() -> None:
    """The coverage table names no character that Typst would refuse under these standards."""
    spans = (folder("templates") / "fonts" / "coverage.txt").read_text().split()
    ends = [[int(end, 16) for end in span.split("-")] for span in spans]
    every = " ".join(
        chr(c) for first, *last in ends for c in range(first, (last or [first])[0] + 1)
    )
    date = build_date()
    for style in ("", '#set text(style: "italic")\n', '#set text(weight: "bold")\n'):
        source = (
            '#set document(title: "t", date: datetime(year: 2026, month: 1, day: 1))\n'
            '#set text(font: ("Libertinus Serif", "STIX Two Math"), fallback: false)\n'
            f"{style}#json(bytes(sys.inputs.texts)).at(0)"
        )

        assert compile_pdf(source, json.dumps([every]), date).startswith(b"%PDF")


def build_date() -> Any:
    """Return any date."""
    from datetime import date  # noqa: PLC0415

    return date(2026, 1, 1)


def test_a_template_cannot_read_files() -> None:
    """The root is an empty folder."""
    source = '#set document(title: "t", date: datetime(year: 2026, month: 1, day: 1))\n'
    for path in ("/etc/passwd", "../../etc/passwd", "main.typ2"):
        with pytest.raises(PrintError):
            compile_pdf(f'{source}#read("{path}")', "[]", build_date())


def test_a_warning_is_a_failure() -> None:
    """An unknown font only warns, and the page would look different."""
    source = (
        '#set document(title: "t", date: datetime(year: 2026, month: 1, day: 1))\n'
        '#set text(font: "No Such Font")\nx'
    )
    with pytest.raises(PrintError, match="font"):
        compile_pdf(source, "[]", build_date())


def test_numbers_stay_with_their_units_places_and_verdicts(record: Record) -> None:
    """Written with a space that does not break, in titles, notes and cells of tables."""
    made = copy.deepcopy(record)
    made["calc"]["title"] = "Clear span 2 of 650 mm, 12 bars"
    pages = pypdf.PdfReader(io.BytesIO(printed(made))).pages
    text = "".join(page.extract_text() for page in pages)

    assert "Clear span\u00a02 of 650\u00a0mm, 12 bars" in text


def test_missing_facts_leave_lines_to_fill(record: Record) -> None:
    """A record of a project that says nothing still prints, and never "None"."""
    record["project"] = {}
    text = text_of(printed(record))

    assert "None" not in text
    assert "Permit to practice" in text


def test_issue_date_is_the_only_date(record: Record) -> None:
    """The document date is the project's; a wrong one is refused with a hint."""
    info = pypdf.PdfReader(io.BytesIO(printed(record))).metadata

    assert info is not None
    assert str(info["/CreationDate"]).startswith("D:20261120")
    record["project"]["issue"]["date"] = "next week"
    with pytest.raises(UserError, match=r"issue\.date: 'next week' is not a date"):
        printed(record)


def test_paper_is_letter_or_a4(record: Record) -> None:
    """US Letter by default, A4 on request, nothing else."""
    letter = pypdf.PdfReader(io.BytesIO(printed(record))).pages[0].mediabox
    record["project"]["paper"] = {"size": "A4"}
    a4 = pypdf.PdfReader(io.BytesIO(printed(record))).pages[0].mediabox
    record["project"]["paper"] = {"size": "A0"}

    assert (float(letter.width), float(letter.height)) == pytest.approx((612, 792))
    assert (float(a4.width), float(a4.height)) == pytest.approx((595.28, 841.89), abs=0.1)
    with pytest.raises(UserError, match=r"paper\.size: 'A0'"):
        printed(record)


def test_many_calcs_share_one_cover(record: Record, failing_record: Record) -> None:
    """Two calcs: facts once, both workings, both records, each failure named."""
    other = copy.deepcopy(failing_record)
    other["calc"] = {"id": "B8 / west", "title": "Second beam"}
    content = printed(record, other)
    text = text_of(content)

    assert records_in_pdf(content) == [record, other]
    assert text.count("Kiln Lane Workshop and Gallery Revision") == 0
    assert "Working, B7" in text
    assert "Working, B8 / west" in text
    assert text.count("Permit to practice") == 1


def test_the_place_of_the_seal_stands_on_one_page() -> None:
    """Wherever the facts begin on the cover; where a page ended the place was cut in two."""
    functions = (folder("templates") / "package.typ").read_text(encoding="utf-8")
    source = f"""#let widest = 178
{functions}
#set document(title: "t", date: datetime(year: 2026, month: 1, day: 1))
#set text(font: serif)
#set page("us-letter", margin: 20mm)
#for n in range(9) {{
  v(n * 25mm)
  sealed-facts(seal-area("Seal", "Signature"), ("Address", "14 Alder Row"), ("Checked by", "A.B."))
  pagebreak(weak: true)
}}"""
    pages = pypdf.PdfReader(io.BytesIO(compile_pdf(source, "[]", build_date()))).pages
    texts = [page.extract_text() for page in pages]
    held = [text for text in texts if "Seal" in text]
    assert len(held) == 9
    assert all("Signature" in text and "Address" in text for text in held)


def test_marks_are_printed_beside_their_line(record: Record) -> None:
    """A reviewer's note stands at the line it belongs to."""
    review = noted({"flexure/M_r": ("changed since revision A",)})
    text = text_of(printed(record, reviews=[review]))

    assert "Mark: changed since revision A" in text
