"""The package as one HTML file: MathML, fonts and record inside, nothing loaded from elsewhere."""

from __future__ import annotations

import base64
import hashlib
from collections.abc import Mapping
from typing import Any

from lineproof.package.environment import html_environment
from lineproof.package.figures import drawing
from lineproof.package.model import Package
from lineproof.package.reviewed import REVIEW_MIME, TALLY_HEADS
from lineproof.record import MIME
from lineproof.resources import folder
from lineproof.typeset.glyphs import MISSING_NOTE

_PIECES = {
    "latin": "U+0000-00FF, U+0131, U+0152-0153, U+02BB-02BC, U+02C6, U+02DA, U+02DC, U+2009, "
    "U+2013-2014, U+2018-201E, U+2020-2026, U+2032-2044, U+20AC, U+2122, U+2191, U+2193, U+2212",
    "latin-ext": "U+0100-0130, U+0132-0151, U+0154-021B, U+0237, U+02C7, U+02D8-02D9, U+02DB, "
    "U+02DD, U+1E80-1E9E, U+2113",
    "greek": "U+0386-03F5",
    "cyrillic": "U+0400-0491, U+2116",
}
_FACES = (
    ("400-normal", "normal", "400"),
    ("400-italic", "italic", "400"),
    ("700-normal", "normal", "700"),
)
TOOLS = ("lines", "marks", "trace", "state", "panel", "start")
"""The review tools, files of one module in the order in which they build on each other."""
FONTS = tuple(
    (f"libertinus-serif-{piece}-{face}.woff2", style, weight)
    for piece in _PIECES
    for face, style, weight in _FACES
)
"""Font files of the page, each with its style and weight."""


def unicode_ranges(file: str) -> str:
    """Return the characters that a font file serves, for its style rule."""
    return _PIECES[file.removeprefix("libertinus-serif-").rsplit("-", 2)[0]]


def to_html(package: Package) -> str:
    """Print a package as a self-contained HTML page; the same package gives the same text."""
    from markupsafe import Markup  # noqa: PLC0415 - comes with jinja2, only printing needs it

    def picture(figure: Mapping[str, Any]) -> str:
        return Markup(drawing(figure).text)  # noqa: S704 - the drawing escapes its texts

    tools = review_tools()
    template = html_environment().get_template("package.html.j2")
    return template.render(
        package=package,
        picture=picture,
        fonts=FONTS,
        ranges=unicode_ranges,
        style=Markup(_style()),  # noqa: S704 - our own style sheet
        tools=Markup(tools),  # noqa: S704 - our own module
        tools_hash=_hash(tools),
        missing_note=MISSING_NOTE,
        record_mime=MIME,
        review_mime=REVIEW_MIME,
        tally_heads=TALLY_HEADS,
    )


def review_tools() -> str:
    """Return the module of the review tools; the page allows no script but this one.

    It stands as character data, so that the page is well formed whatever signs it holds.
    """
    files = (folder("templates") / "review" / f"{name}.js" for name in TOOLS)
    code = "\n".join(file.read_text(encoding="utf-8") for file in files)
    return f"//<![CDATA[\n{code}//]]>"


def _hash(script: str) -> str:
    """Return by what the page's policy knows a script."""
    return base64.b64encode(hashlib.sha256(script.encode()).digest()).decode("ascii")


def _style() -> str:
    sheets = ("package.css", "review/review.css")
    return "\n".join((folder("templates") / name).read_text(encoding="utf-8") for name in sheets)
