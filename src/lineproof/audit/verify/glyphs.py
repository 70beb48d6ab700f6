"""The glyphs of a PDF's fonts, known by what they mean and by how they are drawn.

A page can be made to show one digit and to copy another. So a glyph counts as the same only where
its font, its text and its outline are.
"""

from __future__ import annotations

import hashlib
import io
import re
from collections.abc import Mapping
from dataclasses import dataclass
from typing import Any

_CHARACTER = re.compile(rb"<([0-9A-Fa-f]{2,4})>\s*<([0-9A-Fa-f]+)>")
_RANGE = re.compile(rb"<([0-9A-Fa-f]{2,4})>\s*<([0-9A-Fa-f]{2,4})>\s*<([0-9A-Fa-f]+)>")
_BLOCK = re.compile(rb"begin(bfchar|bfrange)(.*?)endbf(?:char|range)", re.DOTALL)
_PREFIX = re.compile(r"^/?[A-Z]{6}\+")
_LONGEST_RANGE = 0xFFFF
_USUAL_WIDTH = 1000
_FILES = ("/FontFile", "/FontFile2", "/FontFile3")
_DRAWN_BY = {"/CIDFontType0": "/FontFile3", "/CIDFontType2": "/FontFile2"}
"""Which file of a font is drawn, by the kind of the font."""
UNKNOWN = "\ufffd"
"""Stands for a glyph of which the file does not say what it means."""


@dataclass(frozen=True, slots=True)
class Face:
    """A font of a file: its name without the mark of a subset, texts and outlines by code."""

    name: str
    texts: Mapping[int, str]
    outlines: Mapping[int, str]
    wide: bool

    def codes(self, string: bytes) -> list[int]:
        """Return the codes of a shown string: two bytes each in a composite font, else one."""
        if not self.wide:
            return list(string)
        return [string[n] << 8 | string[n + 1] for n in range(0, len(string) - 1, 2)]

    def text(self, string: bytes) -> str:
        """Return what a shown string says."""
        return "".join(self.texts.get(code, UNKNOWN) for code in self.codes(string))

    def glyphs(self, string: bytes) -> tuple[tuple[str, str], ...]:
        """Return text and outline of each glyph of a shown string."""
        return tuple(
            (self.texts.get(code, UNKNOWN), self.outlines.get(code, ""))
            for code in self.codes(string)
        )


def face_of(font: Any) -> Face:
    """Read a font of a page; ``font`` is the dictionary of a PDF reader."""
    wide = font.get("/Subtype") == "/Type0"
    unicode_map = font.get("/ToUnicode")
    texts = {} if unicode_map is None else texts_by_code(unicode_map.get_object().get_data())
    if not texts and not wide:
        texts = {code: bytes([code]).decode("cp1252", "replace") for code in range(256)}
    name = _PREFIX.sub("", str(font.get("/BaseFont", ""))).lstrip("/")
    return Face(name, texts, _outlines(font) if wide else {}, wide)


def texts_by_code(cmap: bytes) -> dict[int, str]:
    """Read a map from codes to text.

    >>> texts_by_code(b"1 beginbfchar <0005> <0035> endbfchar")
    {5: '5'}
    """
    found: dict[int, str] = {}
    for kind, block in _BLOCK.findall(cmap):
        if kind == b"bfchar":
            found |= {int(code, 16): _utf16(text) for code, text in _CHARACTER.findall(block)}
            continue
        for first, last, text in _RANGE.findall(block):
            start, end = int(first, 16), int(last, 16)
            for code in range(start, min(end, start + _LONGEST_RANGE) + 1):
                found[code] = _shifted(_utf16(text), code - start)
    return found


def _utf16(digits: bytes) -> str:
    return bytes.fromhex(digits.decode("ascii").zfill(4)).decode("utf-16-be", "replace")


def _shifted(text: str, steps: int) -> str:
    last = ord(text[-1]) + steps if text else 0
    return text[:-1] + chr(last) if text and last <= 0x10FFFF else text  # noqa: PLR2004 - Unicode


def _outlines(font: Any) -> dict[int, str]:
    """Return what each glyph of a composite font draws and how far it moves on, by its code.

    A code is taken for the number of its glyph: maps that say otherwise make every glyph another.
    """
    descendant = font["/DescendantFonts"][0].get_object()
    descriptor = descendant["/FontDescriptor"].get_object()
    maps = font.get("/Encoding"), descendant.get("/CIDToGIDMap", "/Identity")
    odd = "" if maps == ("/Identity-H", "/Identity") else "mapped"
    kind, files = str(descendant.get("/Subtype", "")), set(_FILES).intersection(descriptor)
    if _DRAWN_BY.get(kind) not in files or len(files) > 1:
        odd += "of another file"  # readers part on which one they draw
    wide = _widths(descendant)
    least = float(descendant.get("/DW", _USUAL_WIDTH))
    for key, draw in (("/FontFile3", _compact), ("/FontFile2", _true_type)):
        if key in descriptor:
            try:
                drawn = draw(descriptor[key].get_object().get_data())
            except Exception:  # noqa: BLE001 - a font that cannot be read is none of ours
                return {}
            return {
                code: f"{odd}{digest} {wide.get(code, least):g}" for code, digest in drawn.items()
            }
    return {}


def _widths(descendant: Any) -> dict[int, float]:
    """Return by how much a page moves on behind each glyph: turned round, 12 would read 21."""
    found: dict[int, float] = {}
    given = [each.get_object() for each in descendant.get("/W", ())]
    while len(given) > 1:
        first, second = int(given[0]), given[1]
        if isinstance(second, list):
            found |= {first + n: float(width) for n, width in enumerate(second)}
            given = given[2:]
        else:
            last = min(int(second), first + _LONGEST_RANGE)
            found |= dict.fromkeys(range(first, last + 1), float(given[2]))
            given = given[3:]
    return found


def _compact(data: bytes) -> dict[int, str]:
    from fontTools.cffLib import CFFFontSet  # noqa: PLC0415 - 0.1 s, only PDFs need it
    from fontTools.pens.recordingPen import RecordingPen  # noqa: PLC0415 - with it

    fonts = CFFFontSet()
    fonts.decompile(io.BytesIO(data), None)
    strings = fonts[0].CharStrings
    parts = (fonts[0], *getattr(fonts[0], "FDArray", ()))
    scales = [part.rawDict.get("FontMatrix") for part in parts]
    drawn = {}
    for place, name in enumerate(fonts[0].charset):
        pen = RecordingPen()
        strings[name].draw(pen)
        code = int(name[3:]) if name.startswith("cid") else place
        drawn[code] = _digest((scales, pen.value), strings[name].width)
    return drawn


def _true_type(data: bytes) -> dict[int, str]:
    from fontTools.pens.recordingPen import (  # noqa: PLC0415 - 0.1 s, only PDFs need it
        DecomposingRecordingPen,
    )
    from fontTools.ttLib import TTFont  # noqa: PLC0415 - with it

    font = TTFont(io.BytesIO(data))
    glyphs = font.getGlyphSet()
    drawn = {}
    for place, name in enumerate(font.getGlyphOrder()):
        pen = DecomposingRecordingPen(glyphs)
        glyphs[name].draw(pen)
        drawn[place] = _digest((font["head"].unitsPerEm, pen.value), glyphs[name].width)
    return drawn


def _digest(outline: object, width: float) -> str:
    return hashlib.sha256(f"{outline} {width:g}".encode()).hexdigest()[:12]
