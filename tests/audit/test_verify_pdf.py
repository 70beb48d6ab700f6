"""PDF packages verified: intact ones, handled ones, forged ones, and files that are none."""

from __future__ import annotations

import io
import re
import time
from collections.abc import Callable, Iterator
from types import SimpleNamespace
from typing import Any

import pypdf
import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st
from pypdf.annotations import FreeText
from pypdf.generic import (
    ArrayObject,
    DecodedStreamObject,
    DictionaryObject,
    FloatObject,
    NameObject,
    NumberObject,
    TextStringObject,
)
from tests.audit import verifying as by

from lineproof.audit.verify import pdf as verify_pdf
from lineproof.audit.verify.data import Alteration, Proof
from lineproof.audit.verify.page import Document, Keys, Mark
from lineproof.audit.verify.verification import Outcome, Source, Verification, Where, verify
from lineproof.errors import UserError
from lineproof.package import Package, to_pdf

WORKING = 3
"""The page of the small package on which its working stands, from 0."""


@pytest.fixture(autouse=True, scope="module")
def printed_once() -> Iterator[None]:
    """Printing a record again gives the same bytes: each is printed once for all tests."""
    known: dict[tuple[str, ...], bytes] = {}

    def printed(package: Package) -> bytes:
        key = (*(calc.record_text for calc in package.calcs), package.facts.paper, str(
            [calc.blocks for calc in package.calcs]))  # fmt: skip
        if key not in known:
            known[key] = to_pdf(package)
        return known[key]

    with pytest.MonkeyPatch.context() as patch:
        patch.setattr(verify_pdf, "to_pdf", printed)
        yield


def said(found: Verification) -> str:
    return "\n".join(altered.sentence for altered in found.alterations)


def number(content: bytes, digit: str, page: int = WORKING) -> by.Spot:
    """Return the first glyph of a digit on a page."""
    return next(spot for spot in by.spots(content) if (spot.page, spot.digit) == (page, digit))


def drawn(text: str, x: float, y: float) -> bytes:
    """Return operators that draw digits with the fonts of the page, as our printer does."""
    codes = by.codes_of(by.pdf(), WORKING)
    shown = "".join(f"\\{codes[c] >> 8:03o}\\{codes[c] & 255:03o}" for c in text)
    return (
        f"\nq 1 0 0 -1 {x} {y} cm/c0 cs 0 scn\nBT 0 Tr/f0 10 Tf 1 0 0 -1 0 0 Tm({shown})Tj\nET\nQ\n"
    ).encode()


def numbers(*values: float) -> ArrayObject:
    return ArrayObject([FloatObject(value) for value in values])


def marks_of(content: bytes, page: int) -> list[Mark]:
    """Return the marks of a page with their places."""
    return Document(Keys()).marks(pypdf.PdfReader(io.BytesIO(content)).pages[page], page)


# -- intact, and what the record cannot prove --------------------------------------------------


def test_a_package_as_issued_is_intact() -> None:
    found = verify(by.pdf(), "beam.pdf")

    assert (found.outcome, found.alterations, found.remarks) == (Outcome.INTACT, (), ())
    assert [(p.calc, p.digest) for p in found.proofs] == [("H1", by.record().digest)]


def test_prose_of_the_notebook_is_told_apart_as_not_provable() -> None:
    found = verify(by.pdf(prose=True), "beam.pdf")

    assert found.outcome is Outcome.INTACT
    assert [(o.page, o.after, o.has_number) for o in found.outside] == [
        (WORKING + 1, "", True), (WORKING + 1, "1.15", True),
    ]  # fmt: skip
    assert "7 of 9 bars" in found.outside[0].text


def test_a_notebook_to_compare_with_proves_the_prose_too() -> None:
    against = [Source(by.record(), by.PROSE)]
    issued = by.pdf(prose=True)
    twelfth = [spot for spot in by.spots(issued) if spot.page == WORKING and spot.digit == "9"]

    assert verify(issued, "beam.pdf", against).outside == ()
    forged = [by.redrawn(issued, WORKING, spot.put("5")) for spot in twelfth]
    outcomes = [verify(content, "beam.pdf", against).outcome for content in forged]
    assert set(outcomes) == {Outcome.ALTERED}


def test_another_paper_is_recognised() -> None:
    from dataclasses import replace  # noqa: PLC0415 - here only

    from lineproof.package import build_package  # noqa: PLC0415 - here only

    package = build_package([by.record()])
    a4 = to_pdf(replace(package, facts=replace(package.facts, paper="a4")))

    assert verify(a4, "beam.pdf").outcome is Outcome.INTACT


# -- forged --------------------------------------------------------------------------------------


@settings(
    max_examples=20, deadline=None, suppress_health_check=[HealthCheck.too_slow],
)  # fmt: skip
@given(data=st.data())
def test_any_other_digit_anywhere_in_the_print_is_found(data: st.DataObject) -> None:
    content = by.pdf()
    spot = data.draw(st.sampled_from(by.spots(content)))
    digit = data.draw(st.sampled_from(sorted(set(spot.codes) - {spot.digit})))

    found = verify(by.redrawn(content, spot.page, spot.put(digit)), "beam.pdf")

    assert found.outcome is Outcome.ALTERED


@settings(
    max_examples=12, deadline=None, suppress_health_check=[HealthCheck.too_slow],
)  # fmt: skip
@given(data=st.data())
def test_a_digit_among_prose_is_found_wherever_the_record_prints_it(data: st.DataObject) -> None:
    """With prose between, pages break elsewhere: numbers of the record are still all compared."""
    content = by.pdf(prose=True)
    prose = {"7", "9", "1", "2", "6", "5", "0"}  # digits of the prose stand outside the record
    spot = data.draw(
        st.sampled_from([s for s in by.spots(content) if s.page != WORKING or s.digit not in prose])
    )
    digit = data.draw(st.sampled_from(sorted(set(spot.codes) - {spot.digit})))

    found = verify(by.redrawn(content, spot.page, spot.put(digit)), "beam.pdf")

    assert found.outcome is Outcome.ALTERED


def test_an_altered_number_names_page_line_and_both_numbers() -> None:
    """6300 is the length of the first bar mark in the table of the last part, page 4."""
    spots = [spot for spot in by.spots(by.pdf()) if spot.page == WORKING]
    place = "".join(spot.digit for spot in spots).rindex("6300")

    found = verify(by.redrawn(by.pdf(), WORKING, spots[place + 1].put("8")), "beam.pdf")

    assert [(a.calc, a.page, a.where) for a in found.alterations] == [("H1", 4, Where.PRINT)]
    assert "6800" in found.alterations[0].found
    assert "6300" in found.alterations[0].recorded


def test_a_white_box_with_a_new_number_on_it_is_found() -> None:
    box = b"\nq 1 0 0 -1 500 400 cm/c0 cs 1 scn 0 0 m 60 0 l 60 12 l 0 12 l\nh\nf\nQ\n"

    over = box + drawn("999", 500, 390)
    found = verify(by.redrawn(by.pdf(), WORKING, lambda c: c + over), "b.pdf")

    assert found.outcome is Outcome.ALTERED
    assert "a box or a line is drawn here" in said(found)
    assert "999" in said(found)


def test_a_number_written_beside_another_is_found() -> None:
    """In the middle of the stream, on the very height of a line, as if it belonged to it."""
    spot = number(by.pdf(), "4")
    operators = by.contents(by.pdf(), WORKING)
    start = operators.rindex(b"\nq 1 0 0 -1 ", 0, spot.start) + 1
    x, y = (float(n) for n in operators[start:].split()[5:7])
    added = drawn("1", x - 6, y)

    found = verify(
        by.redrawn(by.pdf(), WORKING, lambda c: c[:start] + added.lstrip() + c[start:]), "b.pdf"
    )

    assert found.outcome is Outcome.ALTERED


def test_a_line_of_its_own_that_looks_like_the_working_is_found() -> None:
    operators = by.contents(by.pdf(), WORKING)
    label = re.search(rb"q 1 0 0 -1 116\.\d+ ([\d.]+) cm/c0 cs 0 scn\nBT 0 Tr/f1 10 Tf", operators)
    assert label is not None
    start = operators.rindex(b"EMC/", 0, label.start()) + 3
    y = float(label[1]) + 4
    bold = operators[label.start() : operators.index(b"Q\n", label.start()) + 2]
    row = b"/Span<</MCID 900>>BDC\n" + bold.replace(label[1], b"%.2f" % y) + b"EMC"

    found = verify(by.redrawn(by.pdf(), WORKING, lambda c: c[:start] + row + c[start:]), "b.pdf")

    assert found.outcome is Outcome.ALTERED


def test_two_numbers_that_change_places_are_found() -> None:
    """The lengths 6300 and 2150 of two bar marks, by their heights only."""
    operators = by.contents(by.pdf(), WORKING)
    heights = sorted({float(y) for y in re.findall(rb"q 1 0 0 -1 [\d.]+ ([\d.]+) cm", operators)})
    one, other = heights[2], heights[3]

    def swapped(content: bytes) -> bytes:
        texts = [f"{y:.6f}".rstrip("0").encode() for y in (one, other)]
        exact = [re.search(rb" (%b\d*) cm" % re.escape(text[:7]), content) for text in texts]
        assert exact[0] is not None
        assert exact[1] is not None
        first, second = exact[0][1], exact[1][1]
        return (
            content.replace(b" %b cm" % first, b" @ cm")
            .replace(b" %b cm" % second, b" %b cm" % first)
            .replace(b" @ cm", b" %b cm" % second)
        )

    found = verify(by.redrawn(by.pdf(), WORKING, swapped), "b.pdf")

    assert found.outcome is Outcome.ALTERED
    assert "stands at another place" in said(found)


def test_a_number_that_is_not_shown_any_more_is_found() -> None:
    """Text drawn in mode 3 is there to copy but not to see."""
    found = verify(
        by.redrawn(by.pdf(), WORKING, lambda c: c.replace(b"BT 0 Tr", b"BT 3 Tr", 40)), "b.pdf"
    )

    assert found.outcome is Outcome.ALTERED
    assert Where.DRAWN in {altered.where for altered in found.alterations}


def test_a_text_layer_that_says_another_digit_is_found() -> None:
    """Whoever copies or searches would read 7 for every 4; the page looks as before."""

    def altered(content: bytes) -> bytes:
        made = by.writer(content)
        fonts: Any = made.pages[WORKING]["/Resources"]["/Font"]  # type: ignore[index]
        stream = fonts["/f0"]["/ToUnicode"].get_object()
        changed = stream.get_data().replace(b"<0034>\n", b"<0037>\n")
        assert changed != stream.get_data()
        stream.set_data(changed)
        return by.written(made)

    assert verify(altered(by.pdf()), "b.pdf").outcome is Outcome.ALTERED


def test_a_font_that_draws_another_digit_is_found() -> None:
    """The text layer is as before; the glyphs of 4 and 7 have changed places in the font."""
    from fontTools.cffLib import CFFFontSet  # noqa: PLC0415 - here only

    made = by.writer(by.pdf())
    fonts: Any = made.pages[WORKING]["/Resources"]["/Font"]  # type: ignore[index]
    codes = by.codes_of(by.pdf(), WORKING)
    descriptor = fonts["/f0"]["/DescendantFonts"][0].get_object()["/FontDescriptor"].get_object()
    stream = descriptor["/FontFile3"].get_object()
    font = CFFFontSet()
    font.decompile(io.BytesIO(stream.get_data()), None)
    glyphs = font[0].CharStrings
    names = [f"cid{codes[digit]:05d}" for digit in "47"]
    pair = [glyphs[name] for name in names]
    for name, glyph in zip(names, reversed(pair), strict=True):
        glyphs[name] = glyph
    out = io.BytesIO()
    font.compile(out, SimpleNamespace(recalcBBoxes=False))
    stream.set_data(out.getvalue())

    found = verify(by.written(made), "b.pdf")

    assert found.outcome is Outcome.ALTERED
    assert Where.DRAWN in {altered.where for altered in found.alterations}


def each_font(made: Any) -> list[Any]:
    """Return the fonts of the page of the working."""
    fonts = made.pages[WORKING]["/Resources"]["/Font"]
    return [fonts[name].get_object() for name in fonts]


def test_codes_led_to_other_glyphs_are_found() -> None:
    """Fonts and text layer are as before: a map between code and glyph moves all by one."""
    made = by.writer(by.pdf())
    moved = b"begincmap 1 begincidrange <0000> <FFFE> 1 endcidrange endcmap"
    for font in each_font(made):
        stream = DecodedStreamObject()
        stream.set_data(moved)
        font[NameObject("/Encoding")] = made._add_object(stream)

    assert verify(by.written(made), "b.pdf").outcome is Outcome.ALTERED


def test_a_font_of_which_readers_draw_another_file_is_found() -> None:
    """A font of TrueType outlines is drawn from FontFile2, wherever else outlines stand."""
    made = by.writer(by.pdf())
    for font in each_font(made):
        descendant = font["/DescendantFonts"][0].get_object()
        other = {"/CIDFontType0": "/CIDFontType2", "/CIDFontType2": "/CIDFontType0"}
        descendant[NameObject("/Subtype")] = NameObject(other[descendant["/Subtype"]])

    assert verify(by.written(made), "b.pdf").outcome is Outcome.ALTERED


@pytest.mark.parametrize(
    "tag",
    [
        b"/OC <</Type/OCMD>> BDC",
        b"/Span <</ActualText <FEFF00390039>>> BDC",
        b"/Span <</MCID 7/E (99)>> BDC",
        b"/Foo BDC",
    ],
    ids=["layer", "text for a number", "expansion", "tag without properties"],
)
def test_a_tag_around_a_number_that_our_printer_does_not_write_is_found(tag: bytes) -> None:
    """PDF 32000, 8.11 and 14.9.4: a layer may not be shown, and ActualText is what is copied."""
    start = number(by.pdf(), "4").start

    def wrap(operators: bytes) -> bytes:
        first = operators.rindex(b"\nq 1 0 0 -1 ", 0, start) + 1
        last = operators.index(b"\nQ\n", start) + 3
        inside = operators[first:last]
        return operators[:first] + tag + b"\n" + inside + b"EMC\n" + operators[last:]

    found = verify(by.redrawn(by.pdf(), WORKING, wrap), "b.pdf")

    assert found.outcome is Outcome.ALTERED
    assert "is drawn on the page by another program" in said(found)


def test_streams_joined_by_another_program_leave_the_content_intact() -> None:
    made = by.writer(by.pdf())
    page, (before, own) = made.pages[WORKING], (DecodedStreamObject(), DecodedStreamObject())
    before.set_data(b"")
    own.set_data(by.contents(by.pdf(), WORKING))
    page[NameObject("/Contents")] = ArrayObject([made._add_object(each) for each in (before, own)])

    assert verify(by.written(made), "b.pdf").alterations == ()


@pytest.mark.parametrize(
    ("key", "value", "told"),
    [
        ("/Rotate", NumberObject(180), "turned by 180 degrees"),
        ("/UserUnit", FloatObject(0.01), "shown at 0.01 times its size"),
    ],
)
def test_a_page_shown_turned_or_in_another_size_is_told(key: str, value: Any, told: str) -> None:
    made = by.writer(by.pdf())
    made.pages[WORKING][NameObject(key)] = value

    found = verify(by.written(made), "b.pdf")

    assert found.outcome is Outcome.HANDLED
    assert f"page {WORKING + 1}: {told}" in found.remarks


@pytest.mark.parametrize("widths", [[0, [-500] * 200], [0, 300, 0]], ids=["list", "range"])
def test_glyphs_that_move_another_way_are_found(widths: list[Any]) -> None:
    """Moved backwards, 12 reads 21; not moved on, digits lie upon each other."""
    made = by.writer(by.pdf())
    for font in each_font(made):
        given = [numbers(*each) if isinstance(each, list) else FloatObject(each) for each in widths]
        font["/DescendantFonts"][0].get_object()[NameObject("/W")] = ArrayObject(given)

    assert verify(by.written(made), "b.pdf").outcome is Outcome.ALTERED


def test_a_page_taken_out_is_found() -> None:
    made = by.writer(by.pdf())
    made.remove_page(WORKING)

    assert verify(by.written(made), "b.pdf").outcome is Outcome.ALTERED


def test_pages_in_another_order_are_found() -> None:
    made = by.writer(by.pdf())
    kids: Any = made.root_object["/Pages"]["/Kids"]  # type: ignore[index]
    kids[2], kids[3] = kids[3], kids[2]

    assert verify(by.written(made), "b.pdf").outcome is Outcome.ALTERED


@pytest.mark.parametrize("box", ["/CropBox", "/MediaBox"])
def test_a_page_cut_so_that_lines_are_not_shown_is_found(box: str) -> None:
    """Every mark is still in the file, and no reader shows those below the edge."""
    made = by.writer(by.pdf())
    label = next(mark for mark in marks_of(by.pdf(), WORKING) if mark.text == "2.2")
    low = round(label.y + label.size)
    made.pages[WORKING][NameObject(box)] = numbers(0, low, 612, 792)

    found = verify(by.written(made), "b.pdf")

    assert found.outcome is Outcome.ALTERED
    (cut,) = found.alterations
    assert (cut.page, cut.line) == (WORKING + 1, "2.2")
    assert cut.what == f"the page is cut, only 612 by {792 - low} pt of it are shown"


@pytest.mark.parametrize("box", [(0, 0, 400, 792), (100, 0, 612, 792), (0, 0, 612, 730)])
def test_a_page_cut_at_its_sides_or_above_is_found(box: tuple[float, ...]) -> None:
    made = by.writer(by.pdf())
    made.pages[WORKING][NameObject("/CropBox")] = numbers(*box)
    assert "the page is cut" in said(verify(by.written(made), "b.pdf"))


@pytest.mark.parametrize("box", [(30, 20, 582, 780), (-10, -10, 700, 900)])
def test_empty_margins_may_be_cut_off(box: tuple[float, ...]) -> None:
    made = by.writer(by.pdf())
    for page in made.pages:
        page[NameObject("/CropBox")] = numbers(*box)
    assert verify(by.written(made), "b.pdf").intact


# -- handled by others -----------------------------------------------------------------------------


def test_a_comment_laid_over_a_page_is_told_and_alters_no_line() -> None:
    """It stands below all print of the page, above its foot."""
    made = by.writer(by.pdf())
    made.add_annotation(WORKING, FreeText(text="M = 999", rect=(100, 80, 200, 100)))

    found = verify(by.written(made), "b.pdf")

    assert found.outcome is Outcome.HANDLED
    assert "page 4: laid over by others: FreeText “M = 999”" in found.remarks


def test_a_comment_laid_over_print_names_the_lines_below_it() -> None:
    """An opaque one hides a number and may show another: whoever verifies looks at these lines."""
    label = next(mark for mark in marks_of(by.pdf(), WORKING) if mark.text == "2.2")
    low, high = label.y - 1, label.y + label.size
    made = by.writer(by.pdf())
    made.add_annotation(WORKING, FreeText(text="a = 30 mm", rect=(300, low, 560, high)))

    (told,) = [each for each in verify(by.written(made), "b.pdf").remarks if "laid over" in each]

    assert told == "page 4: laid over by others: FreeText “a = 30 mm”, over line 2.2"


def signed(content: bytes) -> bytes:
    """Return a PDF with a signature field appended, as a signing program does."""
    made = by.writer(content, incremental=True)
    value = DictionaryObject({
        NameObject("/Type"): NameObject("/Sig"),
        NameObject("/Filter"): NameObject("/Adobe.PPKLite"),
        NameObject("/Name"): TextStringObject("A. Engineer, P.Eng."),
    })  # fmt: skip
    entry = DictionaryObject({
        NameObject("/FT"): NameObject("/Sig"),
        NameObject("/T"): TextStringObject("Signature1"),
        NameObject("/V"): made._add_object(value),
    })  # fmt: skip
    form = DictionaryObject({NameObject("/Fields"): ArrayObject([made._add_object(entry)])})
    made.root_object[NameObject("/AcroForm")] = made._add_object(form)
    return by.written(made)


def test_a_link_with_a_border_is_laid_over_the_page() -> None:
    """A white border 200 pt wide hides what it lies on; our own links have none."""
    made = by.writer(by.pdf())
    link = DictionaryObject(
        {
            NameObject("/Subtype"): NameObject("/Link"),
            NameObject("/Rect"): numbers(60, 60, 560, 700),
            NameObject("/Border"): numbers(0, 0, 200),
            NameObject("/C"): numbers(1, 1, 1),
        }
    )
    made.pages[WORKING][NameObject("/Annots")] = ArrayObject([made._add_object(link)])

    found = verify(by.written(made), "b.pdf")

    assert found.outcome is Outcome.HANDLED
    (told,) = (remark for remark in found.remarks if "Link" in remark)
    assert told.startswith(f"page {WORKING + 1}: laid over by others: Link, over line ")


def test_a_link_that_starts_a_program_is_told() -> None:
    made = by.writer(by.pdf())
    action = {NameObject("/S"): NameObject("/Launch"), NameObject("/F"): TextStringObject("a.exe")}
    link = {
        NameObject("/Subtype"): NameObject("/Link"),
        NameObject("/Rect"): numbers(60, 60, 560, 700),
        NameObject("/Border"): numbers(0, 0, 0),
        NameObject("/A"): DictionaryObject(action),
    }
    placed = made._add_object(DictionaryObject(link))
    made.pages[WORKING][NameObject("/Annots")] = ArrayObject([placed])

    found = verify(by.written(made), "b.pdf")

    assert [remark for remark in found.remarks if f"page {WORKING + 1}: laid over" in remark]


def _part_shown(made: Any) -> None:
    wanted = DictionaryObject({NameObject("/ViewArea"): NameObject("/TrimBox")})
    made.root_object[NameObject("/ViewerPreferences")] = wanted


def _attached(made: Any) -> None:
    made.add_attachment("values.txt", b"M_r = 999 kN.m")


def _script(made: Any) -> None:
    action = {"/S": NameObject("/JavaScript"), "/JS": TextStringObject("app.alert(9)")}
    made.root_object[NameObject("/OpenAction")] = DictionaryObject(
        {NameObject(key): value for key, value in action.items()}
    )


def _form(made: Any) -> None:
    form = {NameObject("/Fields"): ArrayObject(), NameObject("/XFA"): ArrayObject()}
    made.root_object[NameObject("/AcroForm")] = DictionaryObject(form)


def _portfolio(made: Any) -> None:
    made.root_object[NameObject("/Collection")] = DictionaryObject()


@pytest.mark.parametrize(
    ("add", "told"),
    [
        (_attached, "attached by others: values.txt"),
        (_script, "holds a script or an action that runs when the file or a page is opened"),
        (_form, "holds a form (XFA) that some readers show in place of the pages"),
        (_portfolio, "is made a portfolio"),
        (_part_shown, "asks a reader to show or print a part of each page alone"),
    ],
    ids=["attached", "script", "form", "portfolio", "part of a page"],
)
def test_what_others_put_beside_the_pages_is_told(add: Callable[[Any], None], told: str) -> None:
    made = by.writer(by.pdf())
    add(made)

    found = verify(by.written(made), "b.pdf")

    assert found.outcome is Outcome.HANDLED
    assert [remark for remark in found.remarks if remark.startswith(told)]


def test_a_signature_appended_seals_the_package_and_leaves_it_intact() -> None:
    sealed = signed(by.pdf())

    found = verify(sealed, "b.pdf")

    assert sealed.startswith(by.pdf())
    assert found.outcome is Outcome.HANDLED
    assert any("A. Engineer, P.Eng." in remark for remark in found.remarks)


def test_a_change_appended_is_found_and_the_issue_before_it_is_told_intact() -> None:
    spot = number(by.pdf(), "4")
    forged = by.redrawn(by.pdf(), WORKING, spot.put("7"), incremental=True)

    found = verify(forged, "b.pdf")

    assert forged.startswith(by.pdf())
    assert found.outcome is Outcome.ALTERED
    assert any("the package as issued, intact" in remark for remark in found.remarks)


def merged(*contents: bytes, keep: bool = True) -> bytes:
    """Return PDFs one after another; ``keep`` takes over what is attached to them."""
    made = pypdf.PdfWriter()
    for content in contents:
        reader = pypdf.PdfReader(io.BytesIO(content))
        made.append(reader)
        for name, parts in reader.attachments.items() if keep else ():
            for part in parts:
                made.add_attachment(name, part)
    return by.written(made)


def test_pages_of_others_before_and_after_leave_the_content_intact() -> None:
    found = verify(merged(by.plain_page("Letter"), by.pdf(), by.plain_page("Letter")), "b.pdf")

    assert (found.outcome, said(found)) == (Outcome.HANDLED, "")
    assert (found.pages, found.own_pages) == (8, 6)
    assert "2 page(s) of others before, between or after" in found.remarks


def test_a_number_forged_in_a_merged_file_names_its_page_of_that_file() -> None:
    forged = by.redrawn(by.pdf(), WORKING, number(by.pdf(), "4").put("7"))

    found = verify(merged(by.plain_page("Letter"), forged), "b.pdf")

    assert found.outcome is Outcome.ALTERED
    assert {altered.page for altered in found.alterations} == {WORKING + 2}


def test_two_packages_in_one_file_are_both_verified() -> None:
    found = verify(merged(by.pdf(), by.pdf("H2")), "b.pdf")

    assert (found.outcome, said(found)) == (Outcome.HANDLED, "")
    assert [proof.calc for proof in found.proofs] == ["H1", "H2"]
    assert "2 packages in one file" in found.remarks


def test_the_same_calc_twice_is_a_message() -> None:
    with pytest.raises(UserError, match="two records of calc 'H1' in one file"):
        verify(merged(by.pdf(), by.pdf()), "b.pdf")


# -- stripped, not ours, damaged -------------------------------------------------------------------


def test_a_package_without_its_record_is_stripped_and_compared_with_one_given() -> None:
    stripped = merged(by.pdf(), keep=False)
    forged = by.redrawn(stripped, WORKING, number(by.pdf(), "4").put("7"))
    against = [Source(by.record())]

    assert verify(stripped, "b.pdf").outcome is Outcome.STRIPPED
    found = verify(stripped, "b.pdf", against)
    assert (found.outcome, said(found)) == (Outcome.STRIPPED, "")
    assert [proof.calc for proof in found.proofs] == ["H1"]
    assert said(verify(forged, "b.pdf", against)) != ""


def test_a_file_of_others_is_not_ours() -> None:
    assert verify(by.plain_page("Record 0123456789abcdef"), "b.pdf").outcome is Outcome.NOT_OURS


def encrypted() -> bytes:
    made = by.writer(by.pdf())
    made.encrypt("secret", algorithm="RC4-128")
    return by.written(made)


@pytest.mark.parametrize(
    ("content", "told"),
    [
        (lambda: b"PK\x03\x04 no pdf", "not a PDF"),
        (lambda: by.pdf()[: len(by.pdf()) // 2], "damaged"),
        (encrypted, "encrypted"),
    ],
    ids=["no PDF", "cut off", "encrypted"],
)
def test_what_cannot_be_read_is_told(content: Callable[[], bytes], told: str) -> None:
    with pytest.raises(UserError, match=told):
        verify(content(), "b.pdf")


def test_a_file_with_bytes_missing_inside_is_never_called_intact() -> None:
    content = by.pdf()
    outcomes: set[str] = set()
    for start in range(2000, len(content) - 9000, 20_000):
        try:
            outcomes.add(verify(content[:start] + content[start + 7000 :], "b.pdf").outcome)
        except UserError as error:
            outcomes.add(error.faults[0].partition(",")[0])

    assert outcomes.isdisjoint({Outcome.INTACT, Outcome.HANDLED})


@pytest.mark.parametrize(
    "broken",
    [
        b"q 1 0 0 1 5 5 cm " + b"1 0 0 rg " * 4 + b")",  # a group that never ends
        b"/Span <</Lang (abcdefghijklmnopqrstuvwxyz", b"q 1 0 0 1 5 5 cm " + b"(a" * 3000,
    ],
    ids=["group", "tag", "strings"],
)  # fmt: skip
def test_what_never_ends_in_a_page_is_read_in_no_time(broken: bytes) -> None:
    """A byte of a page was lost, and reading it took hours: each way to part it was tried."""
    content = by.redrawn(by.pdf(), 3, lambda operators: broken + operators)
    began = time.process_time()
    found = verify(content, "b.pdf")

    assert found.outcome is Outcome.ALTERED
    assert time.process_time() - began < 5  # some 0.7 s; the group took more than ten


def test_pages_drawn_again_by_another_program_are_known_but_not_compared() -> None:
    """Printing a package to a PDF again keeps what its footer says and nothing of our printer."""
    digest = by.record().digest
    again = by.plain_page(f"Record {digest}   Page 1 of 6")

    found = verify(again, "b.pdf", [Source(by.record())])

    assert found.outcome is Outcome.STRIPPED
    assert "name the record given and have been drawn again" in said(found)


@pytest.mark.parametrize(("altered", "told"), [(1, False), (2, False), (3, True)])
def test_where_most_lines_differ_another_version_is_thought_of(altered: int, *, told: bool) -> None:
    """Of four lines: two are half of them, three are most."""
    alterations = tuple(
        Alteration(Where.PRINT, "the print differs", "B1", id=f"a/x_{n}") for n in range(altered)
    )
    found = Verification("a.pdf", Outcome.ALTERED, (Proof("B1", "0" * 16, 4),), alterations)

    assert verify_pdf.most_differ(found) is told


def test_a_record_altered_in_many_lines_is_no_other_version() -> None:
    alterations = tuple(
        Alteration(Where.RECORD, "the value differs", "B1", id=f"a/x_{n}") for n in range(4)
    )
    found = Verification("a.pdf", Outcome.ALTERED, (Proof("B1", "0" * 16, 4),), alterations)

    assert not verify_pdf.most_differ(found)


def test_where_every_number_is_another_it_stays_altered_with_a_remark() -> None:
    """Every digit of the working put for another: most lines differ, whoever did it."""
    spots = [spot for spot in by.spots(by.pdf()) if spot.page == WORKING]

    def others(operators: bytes) -> bytes:
        heads = [m.span() for m in re.finditer(rb"/Artifact<<.*?EMC", operators, re.DOTALL)]
        for spot in reversed(spots):  # from behind, so that the places before stay
            if any(start < spot.start < end for start, end in heads):
                continue  # head and foot of the page say which package it is of
            digit = next(d for d in sorted(spot.codes) if d != spot.digit)
            operators = spot.put(digit)(operators)
        return operators

    found = verify(by.redrawn(by.pdf(), WORKING, others), "a.pdf")

    assert found.outcome is Outcome.ALTERED
    assert found.remarks[-1] == verify_pdf.ANOTHER_VERSION
