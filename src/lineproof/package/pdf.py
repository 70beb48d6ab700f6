"""The package as a PDF: archival (PDF/A-3a), accessible (PDF/UA-1), with its records attached."""

from __future__ import annotations

import atexit
import datetime as dt
import shutil
import tempfile
import threading
from functools import cache
from pathlib import Path
from typing import TYPE_CHECKING, Any

from lineproof.errors import UserError
from lineproof.package.environment import Interned, Verbatim, typst_environment
from lineproof.package.figures import drawing, paper_width
from lineproof.package.heap import steady_heap
from lineproof.package.model import Package
from lineproof.package.read import RECORD_SUFFIX
from lineproof.package.reviewed import REVIEW_MIME, REVIEW_SUFFIX, TALLY_HEADS
from lineproof.record import MIME
from lineproof.resources import folder
from lineproof.typeset.glyphs import MISSING_NOTE

if TYPE_CHECKING:
    import typst

STANDARDS = ["a-3a", "ua-1"]
_TOO_LONG = "PDF string is longer than"
_SUSPECTS = b"/Suspects false"
_local = threading.local()


class PrintError(RuntimeError):
    """The package could not be printed: a fault of a template, not of the user's input."""


def to_pdf(package: Package) -> bytes:
    """Print a package; the same package gives the same bytes."""
    source, texts = typst_source(package)
    return compile_pdf(source, texts, package.facts.date)


def typst_source(package: Package) -> tuple[str, str]:
    """Return the Typst source, which holds no user text, and the JSON list of its texts."""
    interned = Interned()
    template = typst_environment().get_template("package.typ.j2")
    source = template.render(
        package=package,
        interned=interned,
        drawing=drawing,
        paper_width=paper_width,
        verbatim=Verbatim,
        missing_note=MISSING_NOTE,
        record_mime=MIME,
        review_mime=REVIEW_MIME,
        record_suffix=RECORD_SUFFIX,
        review_suffix=REVIEW_SUFFIX,
        tally_heads=TALLY_HEADS,
        year=str(package.facts.date.year),
        month=str(package.facts.date.month),
        day=str(package.facts.date.day),
    )
    break_long_words = "true" if interned.long_words else "false"
    return f"#let break-long-words = {break_long_words}\n{source}", interned.to_json()


def compile_pdf(source: str, texts: str, date: dt.date) -> bytes:
    """Compile Typst source with its texts; a warning is a failure."""
    import typst  # noqa: PLC0415 - only printing needs it

    moment = dt.datetime(date.year, date.month, date.day, tzinfo=dt.UTC)
    try:
        made, warnings = _compiler().compile_with_warnings(
            source.encode(),
            format="pdf",
            sys_inputs={"texts": texts},
            pdf_standards=list(STANDARDS),
            timestamp=moment,
        )
    except typst.TypstError as error:
        if _TOO_LONG in error.message:
            raise UserError(
                "a title, a heading or a word has more than 32767 characters, which a PDF cannot "
                "hold; shorten it"
            ) from None
        raise PrintError(f"Typst: {error.message}\n{error.diagnostic}") from error
    if warnings:
        raise PrintError("Typst: " + "; ".join(warning.message for warning in warnings))
    return _without_suspects(bytes(made))


def _without_suspects(made: bytes) -> bytes:
    """Blank ``/Suspects false`` in the catalog: it is the default (ISO 32000-1, table 321).

    Widespread readers take the false itself for a fault and say so for every file. The catalog
    stands last in the file, and blanks of the same length leave every offset in place.
    """
    before, found, after = made.rpartition(_SUSPECTS)
    return before + b" " * len(found) + after


@cache
def _empty_root() -> Path:
    """Return a folder with nothing in it: what a template cannot see it cannot print."""
    root = Path(tempfile.mkdtemp(prefix="lineproof-"))
    atexit.register(shutil.rmtree, root, ignore_errors=True)
    return root


def _compiler() -> Any:
    """Return this thread's compiler; one compiler cannot serve two threads at once."""
    made = getattr(_local, "compiler", None)
    if made is None:
        import typst  # noqa: PLC0415 - only printing needs it

        steady_heap()
        made = _local.compiler = typst.Compiler(root=str(_empty_root()), font_paths=_fonts())
    return made


@cache
def _fonts() -> typst.Fonts:
    """Return the fonts bundled with Typst and our own; never those of the machine."""
    import typst  # noqa: PLC0415 - only printing needs it

    return typst.Fonts(
        include_system_fonts=False,
        include_embedded_fonts=True,
        font_paths=[str(folder("templates") / "fonts")],
    )
