"""The study of a tee section that the tests of section studies look at."""

from __future__ import annotations

from typing import Any

from lineproof import beams
from lineproof.record import Record
from lineproof.sheet import Sheet

from .gallery import PROJECT_2015

CALLS = ("cracking", "bars", "balanced", "resistance", "second_path", "capacity")
# independent check no. 5b as a whole section: b 900, h_f 100, b_w 300, f'c 35
TEE: dict[str, Any] = {
    "b_f": "900 mm", "h_f": "100 mm", "b_w": "300 mm", "h": "665 mm", "f_c": "35 MPa",
    "grade": "400R", "bars": "3-30M / 3-30M", "cover": "40 mm",
}  # fmt: skip


def study(**changes: Any) -> Record:
    """Return the record of the whole study with some inputs changed."""
    sheet = Sheet("T1", "Tee section", project=PROJECT_2015)
    made = beams.section_study(sheet, **(TEE | changes))
    for call in CALLS:
        getattr(made, call)()
    return sheet.close()
