"""Records out of printed packages, and clear errors for damaged ones."""

from __future__ import annotations

import io
import json
from typing import Any

import pypdf
import pytest

from lineproof.errors import UserError
from lineproof.package import build_package, records_in_html, records_in_pdf, to_html, to_pdf

SCRIPT = '<script type="application/vnd.lineproof.record+json">{}</script>'


def pdf_with(*attachments: tuple[str, bytes]) -> bytes:
    """Return a PDF with these files attached."""
    writer = pypdf.PdfWriter()
    writer.add_blank_page(100, 100)
    for name, data in attachments:
        writer.add_attachment(name, data)
    out = io.BytesIO()
    writer.write(out)
    return out.getvalue()


def test_both_files_carry_the_record(record: dict[str, Any]) -> None:
    """Equal, also with hostile text inside."""
    record["calc"]["title"] = "</script>\u2028<!-- \U0001f600 \x00"
    package = build_package([record])

    assert records_in_pdf(to_pdf(package)) == [record]
    assert records_in_html(to_html(package)) == [record]


@pytest.mark.parametrize(
    ("content", "said"),
    [
        (b"", "its end is missing"),
        (b"%PDF-1.7\ngarbage", "its end is missing"),
        (b"%PDF-1.7\n" + b"1 0 obj\n" * 4_000_000, "its end is missing"),
        (b"%PDF-1.7\nstartxref\n5\n%%EOF", "it is damaged"),
        (pdf_with(), "no record is attached"),
        (pdf_with(("notes.txt", b"{}")), "no record is attached"),
        (pdf_with(("B7.lineproof.json", b"{")), "'B7.lineproof.json' is damaged: not readable"),
        (pdf_with(("B7.lineproof.json", b"\xff\xfe")), "not UTF-8"),
        (pdf_with(("B7.lineproof.json", b"[1]")), "not a record"),
        (
            pdf_with(*[(f"{n}.lineproof.json", b'{"calc": {"id": "B7"}}') for n in "ab"]),
            "two records of calc 'B7'",
        ),
    ],
)
def test_pdf_that_carries_no_good_record(content: bytes, said: str) -> None:
    """Each says what is wrong with the file."""
    with pytest.raises(UserError) as error:
        records_in_pdf(content)
    assert said in str(error.value)


@pytest.mark.parametrize(
    ("page", "said"),
    [
        ("", "no record in this HTML"),
        ("<script>var x = 1</script>", "no record in this HTML"),
        (SCRIPT.format("{"), "record 1 is damaged"),
        (SCRIPT.format("[" * 100_000), "record 1 is damaged"),
        (SCRIPT.format("3"), "not a record"),
        (SCRIPT.format("{}")[:-9] * 100_000, "is cut short"),  # one pass, not one for each
        ('<script type="application/vnd.lineproof.record+json" ' * 100_000, "no record in this"),
        (SCRIPT.format('{"calc": {"id": "B7"}}') * 2, "two records of calc 'B7'"),
    ],
)
def test_page_that_carries_no_good_record(page: str, said: str) -> None:
    """Each says what is wrong with the page."""
    with pytest.raises(UserError) as error:
        records_in_html(page)
    assert said in str(error.value)


def test_a_pdf_printed_again_loses_its_record(record: dict[str, Any]) -> None:
    """Pages alone carry nothing, and the error says why."""
    reader = pypdf.PdfReader(io.BytesIO(to_pdf(build_package([record]))))
    writer = pypdf.PdfWriter()
    for page in reader.pages:
        writer.add_page(page)
    out = io.BytesIO()
    writer.write(out)

    with pytest.raises(UserError, match="drops the attachment"):
        records_in_pdf(out.getvalue())


def test_records_keep_their_order(record: dict[str, Any]) -> None:
    """Three calcs of one package come back as they went in."""
    many = [{**record, "calc": {"id": name, "title": name}} for name in ("B9", "B1", "B10")]
    package = build_package(many)

    assert json.dumps(records_in_pdf(to_pdf(package))) == json.dumps(many)
    assert records_in_html(to_html(package)) == many


def test_a_damaged_pdf_is_told_once(caplog: pytest.LogCaptureFixture) -> None:
    """The reader's own warnings do not stand between our sentences."""
    with pytest.raises(UserError, match="it is damaged"):
        records_in_pdf(b"garbage\nstartxref\n5\n")
    assert not caplog.records
