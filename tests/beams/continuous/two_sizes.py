"""Bars of two sizes along the existing beam of the notebooks.

h 600, b_w 350, cover 30 to stirrups 10M (11.3 mm), f_c' 25, f_y 400.
"""

from __future__ import annotations

from typing import Any

from lineproof.sheet import Sheet

from .beam_with_gaps import Row, row
from .flow import CALLS, run, start
from .notebooks import EXISTING_BEAM, inputs_of

INSIDE = 30 + 11.3
D_20, D_25 = 600 - INSIDE - 19.5 / 2, 600 - INSIDE - 25.2 / 2
"""Depth of a first layer of 20M, of 25M."""
TOP = [row("top", "2-25M", -0.1, 14.5), row("top", "1-20M", 5.2, 9.2)]
SPREAD = row("top", "2-15M", 5.2, 9.2, place="overhang")
FLEXURE = CALLS[: CALLS.index("flexure") + 1]


def beam(runs: list[Row], calls: tuple[str, ...] = CALLS, **changes: Any) -> Sheet:
    """The sheet of the existing beam with other bars along it."""
    return run(start(**(inputs_of(EXISTING_BEAM) | {"bar_runs": runs} | changes)), calls)
