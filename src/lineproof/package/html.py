"""The package as one HTML file: MathML, fonts and record inside, nothing loaded from elsewhere."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any

from lineproof.package.environment import html_environment
from lineproof.package.figures import drawing
from lineproof.package.model import Package
from lineproof.resources import folder
from lineproof.typeset.glyphs import MISSING_NOTE


def to_html(package: Package) -> str:
    """Print a package as a self-contained HTML page; the same package gives the same text."""
    from markupsafe import Markup  # noqa: PLC0415 - comes with jinja2, only printing needs it

    def picture(figure: Mapping[str, Any]) -> str:
        return Markup(_inline(drawing(figure).text))  # noqa: S704 - the drawing escapes its texts

    template = html_environment().get_template("package.html.j2")
    return template.render(
        package=package,
        picture=picture,
        style=Markup(_style()),  # noqa: S704 - our own style sheet
        missing_note=MISSING_NOTE,
    )


def _style() -> str:
    return (folder("templates") / "package.css").read_text(encoding="utf-8")


def _inline(svg: str) -> str:
    """Return a drawing for use inside HTML, where an XML declaration is not allowed."""
    return svg[svg.index("<svg") :]
