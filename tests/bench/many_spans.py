"""The gallery floor beam with any number of spans, for the benchmarks."""

from __future__ import annotations

from typing import Any

from lineproof import Sheet, beams
from lineproof.record.record import Record
from lineproof.resources import folder

CALCS = folder("calcs")
LENGTHS = ("7.6 m", "9.2 m", "7.6 m")
CHAPTERS = (
    "loads", "spans", "analysis", "flexure", "shear", "deflections", "anchorage", "schedule",
    "summary",
)  # fmt: skip


def before_chapters(spans: int) -> tuple[Sheet, Any]:
    """Return the gallery floor beam with so many spans, its inputs read."""
    sheet = Sheet.open("B7", project=CALCS / "project.toml")
    beam = beams.continuous_beam(
        sheet,
        spans=[LENGTHS[n % 3] for n in range(spans)],
        supports=["girder 400 mm", *["column 450 mm"] * (spans - 1), "girder 400 mm"],
        h="620 mm", b_w="380 mm", h_f="140 mm", spacing="3.1 m", f_c="32 MPa", grade="400R",
        superimposed="1.8 kPa", use="assembly area", exposure="N", fire_rating="2 h",
        cover="30 mm", slab_bars="2 x 10M at 300 mm",
    )  # fmt: skip
    return sheet, beam


def recorded(spans: int) -> Sheet:
    """Go through all chapters of a beam, the sheet still open."""
    sheet, beam = before_chapters(spans)
    for chapter in CHAPTERS:
        getattr(beam, chapter)()
    return sheet


def whole(spans: int) -> Record:
    """Design and record a beam, the record closed and its printed strings fixed."""
    return recorded(spans).close()
