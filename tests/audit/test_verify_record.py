"""Records changed by hand inside a package: any number anywhere, and texts that look like code."""

from __future__ import annotations

import copy
import json
from collections.abc import Iterator
from dataclasses import replace
from typing import Any

import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st
from tests.audit import verifying as by

from lineproof.audit.verify.verification import Outcome, Source, Where, verify
from lineproof.errors import UserError
from lineproof.package import build_package, to_html, to_pdf

Path = tuple[str | int, ...]


def numbers(data: object, path: Path = ()) -> Iterator[tuple[Path, int]]:
    """Give the path of every number of plain data, and of every digit of its texts.

    The second of a pair is the place of the digit in its text, -1 for a number.
    """
    if isinstance(data, dict):
        for key, value in data.items():
            yield from numbers(value, (*path, key))
    elif isinstance(data, list):
        for place, value in enumerate(data):
            yield from numbers(value, (*path, place))
    elif isinstance(data, str):
        yield from ((path, place) for place, letter in enumerate(data) if letter.isdigit())
    elif isinstance(data, int | float) and not isinstance(data, bool):
        yield path, -1


def changed(path: Path, place: int) -> str:
    """Return the text of the record with one number changed by one, or one digit to the next."""
    data = copy.deepcopy(by.record().data)
    inner: Any = data
    for key in path[:-1]:
        inner = inner[key]
    value = inner[path[-1]]
    if place < 0:
        inner[path[-1]] = value + 1
    else:
        digit = str((int(value[place]) + 1) % 10)
        inner[path[-1]] = value[:place] + digit + value[place + 1 :]
    return json.dumps(data, ensure_ascii=False, separators=(",", ":"))


def page_with(text: str) -> str:
    """Return the page of the right record that carries another text as its record."""
    package = build_package([by.record()])
    return to_html(replace(package, calcs=(replace(package.calcs[0], record_text=text),)))


def pdf_with(text: str) -> bytes:
    """Return the PDF of the right record that carries another text as its record."""
    package = build_package([by.record()])
    return to_pdf(replace(package, calcs=(replace(package.calcs[0], record_text=text),)))


def caught(content: bytes, name: str) -> bool:
    """Tell whether a file is found altered, or refused as damaged."""
    try:
        return verify(content, name).outcome is Outcome.ALTERED
    except UserError:
        return True


PLACES = tuple(numbers(by.record().data))


@settings(max_examples=40, deadline=None, suppress_health_check=[HealthCheck.too_slow])
@given(spot=st.sampled_from(PLACES))
def test_any_number_of_the_record_changed_is_found_in_a_page(spot: tuple[Path, int]) -> None:
    assert caught(page_with(changed(*spot)).encode(), "b.html"), spot


@settings(max_examples=10, deadline=None, suppress_health_check=[HealthCheck.too_slow])
@given(spot=st.sampled_from(PLACES))
def test_any_number_of_the_record_changed_is_found_in_a_pdf(spot: tuple[Path, int]) -> None:
    assert caught(pdf_with(changed(*spot)), "b.pdf"), spot


def test_a_given_changed_in_the_record_names_line_and_what_it_does() -> None:
    """l typed as 6 m, changed to 7 m: M_f is 40 x 7^2/8 = 245 kN.m and no longer 180."""
    text = by.record().to_text().replace('"typed":"6 m"', '"typed":"7 m"')

    found = verify(page_with(text).encode(), "b.html").alterations

    told = {(a.id, a.line, a.where) for a in found if a.where is Where.RECORD}
    assert ("given/l", "1.15", Where.RECORD) in told
    moment = next(a for a in found if a.id == "beam/M_f" and a.where is Where.RECORD)
    assert moment.recorded == "245"
    assert moment.found == "180"


def test_a_record_that_differs_from_the_one_given_names_the_line() -> None:
    """Issued again with other steel: five bars for four."""
    other = by.record().to_text().replace('"typed":"4"', '"typed":"5"')
    assert other != by.record().to_text()
    from lineproof.record import Record  # noqa: PLC0415 - here only

    found = verify(by.html().encode(), "b.html", [Source(Record.from_text(other))])

    assert found.outcome is Outcome.ALTERED
    assert [(a.id, a.what) for a in found.alterations] == [
        ("given/n_b", "the record differs from the one given")
    ]


@pytest.mark.parametrize(
    ("old", "new"),
    [
        ('"formula":"M_f = w_f*l**2/8"', '"formula":"M_f = __import__(\'os\')"'),
        ('"formula":"M_f = w_f*l**2/8"', '"formula":"M_f = (lambda: 1)()"'),
        ('"kind":"line"', '"kind":"__class__"'),
        ('"schema":1', '"schema":2'),
        ('"digest":', '"digest":NaN,"x":'),
    ],
)
def test_a_record_with_code_or_nonsense_is_refused_with_a_message(old: str, new: str) -> None:
    text = by.record().to_text()
    assert old in text

    with pytest.raises(UserError):
        verify(page_with(text.replace(old, new, 1)).encode(), "b.html")
    with pytest.raises(UserError):
        verify(pdf_with(text.replace(old, new, 1)), "b.pdf")


def test_text_that_looks_like_code_stays_text() -> None:
    """A title with markup and operators of a PDF is printed and compared as it stands."""
    text = by.record().to_text().replace('"title":"Bars"', '"title":"<script>) Tj ET Q"')
    assert text != by.record().to_text()
    from lineproof.record import Record  # noqa: PLC0415 - here only

    package = build_package([Record.from_text(text)])

    found = [verify(to_html(package).encode(), "b.html"), verify(to_pdf(package), "b.pdf")]
    assert {a.what for f in found for a in f.alterations} <= {
        "digest of the record does not follow from it"
    }
    assert all(a.where is Where.RECORD for f in found for a in f.alterations)
