"""What cures say of the three-span beam, read to be typed back in."""

from __future__ import annotations

import re
from typing import Any

from lineproof.record import Entry
from lineproof.sheet import Sheet

from .flow import CALLS, run, start, without_cures

SPACING = 3.1
"""Centre to centre of the beams [m]."""
WEIGHT = 24.0
"""Of reinforced concrete of normal density, as the beam takes it [kN/m3]."""


def sheet_of(calls: tuple[str, ...] = CALLS, **inputs: Any) -> Sheet:
    """Return the sheet of the three spans with some inputs changed."""
    return run(start(**inputs), calls)


def checked(calls: tuple[str, ...] = CALLS, **inputs: Any) -> Sheet:
    """Return the sheet of the three spans with a cure typed in, of which the checks are asked."""
    return run(without_cures(start(**inputs)), calls)


def note(sheet: Sheet, part: str, key: str = "") -> str:
    """Return the text of the one cure of a part, or of that of one check."""
    entries = sheet.entries_of(part).items()
    (text,) = [e.source.text for s, e in entries if s.startswith(f"cure-{key}")]
    return str(text)


def told(text: str, pattern: str) -> float:
    """Return a number told in a cure."""
    match = re.search(pattern, text)
    assert match is not None, text
    return float(match[1])


def check(sheet: Sheet, entry: str) -> Entry:
    """Return a recorded check."""
    return sheet.entry(entry)


def lighter(**sizes: float) -> dict[str, str]:
    """Return inputs with another depth or width [mm], the whole dead load as it was.

    The web below the slab weighs more; the moments are compared where it matters.
    """
    before = {"h": sizes.pop("h_before", 620.0), "b_w": 380.0}
    after = before | sizes
    below = [(at["h"] - 140.0) * at["b_w"] / 1e6 for at in (before, after)]
    more = (below[1] - below[0]) * WEIGHT
    made = {name: f"{value:g} mm" for name, value in sizes.items()}
    return made | {"superimposed": f"{1.8 - more / SPACING:.9f} kPa"}


FLEXURE = ("loads", "spans", "analysis", "flexure")
