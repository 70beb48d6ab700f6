"""A small package and what others may do to it, for the tests of verifying.

The package is that of the beam by hand with a table, a figure and a note. Forgeries are made with
pypdf on the operators of a page, not with the code that looks for them.
"""

from __future__ import annotations

import io
import re
from collections.abc import Callable, Iterator
from dataclasses import dataclass
from functools import cache
from typing import Any

import pypdf
from pypdf.generic import (
    DecodedStreamObject,
    DictionaryObject,
    NameObject,
)
from tests.audit.hand import sheet_of

from lineproof.drawing import Figure, Line, Text, to_json
from lineproof.drawing.shapes import words
from lineproof.package import build_package, to_html, to_pdf
from lineproof.record import Record

PROSE = (
    ("prose", "# Beam by hand\n\nThe block is {{ a }} deep; 7 of 9 bars lie in one layer."),
    ("part", "given"),
    ("prose", "## Strength\n\nAs the drawing of 12 May has it."),
    ("part", "beam"),
    ("part", "strength"),
)


@cache
def record(calc: str = "H1") -> Record:
    """Return the record of the beam by hand, with a table, a figure and a note."""
    sheet = sheet_of()
    sheet.calc["id"] = calc
    with sheet.part("strength", "Strength"):
        sheet.check("M_f <= M_r", key="strength", title="Moment resistance")
        sheet.table(
            "bars",
            ["Mark", "Bars", "Length, mm"],
            [["B1", "4-20M", "6300"], ["B2", "2-15M", "2150"]],
            title="Bars",
        )  # fmt: skip
        shapes = (Line((0, 0), (400, 0)), Text((200, 60), words("400")))
        drawn = Figure(60, 30, 0.1, (10, 10), shapes, "A width of 400")
        sheet.figure("section", to_json(drawn), title="Width 400", alt="A width of 400")
        sheet.note("says", "Bars lie in one layer of 4.", title="Layers")
    return sheet.close()


@cache
def pdf(calc: str = "H1", *, prose: bool = False) -> bytes:
    """Return the printed package."""
    return to_pdf(build_package([record(calc)], [PROSE if prose else None]))


@cache
def html(*, prose: bool = False) -> str:
    """Return the package as a page."""
    return to_html(build_package([record()], [PROSE if prose else None]))


def writer(content: bytes, **options: Any) -> pypdf.PdfWriter:
    """Return a writer that holds a copy of a PDF."""
    if options.get("incremental"):
        return pypdf.PdfWriter(io.BytesIO(content), **options)
    return pypdf.PdfWriter(clone_from=io.BytesIO(content), **options)


def written(made: pypdf.PdfWriter) -> bytes:
    """Return what a writer holds."""
    stream = io.BytesIO()
    made.write(stream)
    return stream.getvalue()


def contents(content: bytes, page: int) -> bytes:
    """Return the drawing operators of a page."""
    stream = pypdf.PdfReader(io.BytesIO(content)).pages[page].get_contents()
    assert stream is not None
    return stream.get_data()


def redrawn(content: bytes, page: int, change: Callable[[bytes], bytes], **options: Any) -> bytes:
    """Return a PDF with the drawing operators of a page changed."""
    made = writer(content, **options)
    operators = contents(content, page)
    changed = change(operators)
    assert changed != operators
    stream = DecodedStreamObject()
    stream.set_data(changed)
    made.pages[page][NameObject("/Contents")] = made._add_object(stream)
    return written(made)


@dataclass(frozen=True)
class Spot:
    """A glyph of a digit in the operators of a page: where its code stands, and other digits."""

    page: int
    start: int
    digit: str
    codes: dict[str, int]

    def put(self, digit: str) -> Callable[[bytes], bytes]:
        """Return a change that puts another digit in its place."""
        code = self.codes[digit]
        shown = f"\\{code >> 8:03o}\\{code & 255:03o}".encode()

        def change(operators: bytes) -> bytes:
            old = _CODE.match(operators, self.start)
            assert old is not None
            return operators[: self.start] + shown + operators[old.end() :]

        return change


_BYTE = rb"(?:\\[0-7]{1,3}|\\.|[^\\])"
_CODE = re.compile(_BYTE + _BYTE, re.DOTALL)
_TEXTS = re.compile(rb"/(f\d+) [\d.]+ Tf.*?ET", re.DOTALL)
_SHOWN = re.compile(rb"\(((?:\\.|\((?:\\.|[^()\\])*\)|[^()\\])*)\)", re.DOTALL)
_MAPPED = re.compile(rb"<([0-9A-F]{4})> <([0-9A-F]{4})>\n")


@cache
def spots(content: bytes) -> tuple[Spot, ...]:
    """Return every digit of the text of a PDF."""
    return tuple(_spots(content))


def _spots(content: bytes) -> Iterator[Spot]:
    for number, page in enumerate(pypdf.PdfReader(io.BytesIO(content)).pages):
        operators = contents(content, number)
        fonts: Any = page["/Resources"]["/Font"]  # type: ignore[index]
        maps = {name[1:].encode(): _codes(fonts[name]["/ToUnicode"].get_data()) for name in fonts}
        for text in _TEXTS.finditer(operators):
            codes = maps[text[1]]
            digits = {code: digit for digit, code in codes.items()}
            for shown in _SHOWN.finditer(operators, text.start(), text.end()):
                for found in _CODE.finditer(operators, shown.start(1), shown.end(1)):
                    code = _number(found[0])
                    if code in digits:
                        yield Spot(number, found.start(), digits[code], codes)


def codes_of(content: bytes, page: int, font: str = "/f0") -> dict[str, int]:
    """Return the codes of the digits in a font of a page."""
    fonts: Any = pypdf.PdfReader(io.BytesIO(content)).pages[page]["/Resources"]["/Font"]  # type: ignore[index]
    return _codes(fonts[font]["/ToUnicode"].get_data())


def _codes(unicode_map: bytes) -> dict[str, int]:
    found = {chr(int(text, 16)): int(code, 16) for code, text in _MAPPED.findall(unicode_map)}
    return {text: code for text, code in found.items() if text.isdigit() and text.isascii()}


def _number(code: bytes) -> int:
    escapes = {b"\\n": 10, b"\\r": 13, b"\\t": 9, b"\\b": 8, b"\\f": 12}
    total = 0
    for byte in re.findall(_BYTE, code, re.DOTALL):
        if byte in escapes:
            value = escapes[byte]
        elif byte[:1] == b"\\" and byte[1:].isdigit():
            value = int(byte[1:], 8)
        else:
            value = byte[-1]
        total = total << 8 | value
    return total


def plain_page(text: str) -> bytes:
    """Return a PDF of one page by somebody else."""
    made = pypdf.PdfWriter()
    page = made.add_blank_page(612, 792)
    font = DictionaryObject({
        NameObject("/Type"): NameObject("/Font"),
        NameObject("/Subtype"): NameObject("/Type1"),
        NameObject("/BaseFont"): NameObject("/Helvetica"),
    })  # fmt: skip
    fonts = DictionaryObject({NameObject("/F1"): made._add_object(font)})
    page[NameObject("/Resources")] = DictionaryObject({NameObject("/Font"): fonts})
    stream = DecodedStreamObject()
    stream.set_data(f"BT /F1 12 Tf 72 720 Td ({text}) Tj ET".encode())
    page[NameObject("/Contents")] = made._add_object(stream)
    return written(made)
