"""The shear resistance along a beam for cutting its bars: the least of all cases in each piece."""

from __future__ import annotations

from collections.abc import Iterator
from itertools import pairwise

import numpy as np

from lineproof.beams.continuous.detailing_data import ShearStretch
from lineproof.beams.continuous.layout import BeamOutline
from lineproof.beams.continuous.shear_check import SpanCheck
from lineproof.beams.continuous.shear_choice import RESERVE
from lineproof.beams.continuous.stirrups_choice import Choice


def shear_stretches(choice: Choice, outline: BeamOutline) -> tuple[ShearStretch, ...]:
    """Return pieces no longer than the depth, from face to face of every span.

    Each has the smallest V_r, V_s and angle of all cases and stations within it, less a thousandth
    for what lies between stations: what cutting bars asks for is then never less than any case
    asks for. Where torsion counts, V_s is without the legs that torsion takes.
    """
    return tuple(
        piece
        for check in choice.checks
        for piece in _pieces(check, outline.axes[check.state.numbers.span - 1])
    )


def _pieces(check: SpanCheck, axis: float) -> Iterator[ShearStretch]:
    state, v = check.state, check.state.v
    start = state.faces[0]
    V_s = np.maximum(check.bars["V_s"], 0.0)
    V_r = np.where(check.plain, v["V_plain"], np.minimum(v["V_c"] + V_s, v["V_rmax"]))
    edges = {0.0, check.bands[-1].end, *(band.start for band in check.bands)}
    edges |= set(np.arange(0.0, check.bands[-1].end, state.h).tolist())
    bounds = sorted(edges)
    for low, high in pairwise(bounds):
        # One station further at each end, so that what lies between stations is covered.
        first = int(np.searchsorted(check.u, low, side="left")) - 1
        last = int(np.searchsorted(check.u, high, side="right")) + 1
        inside = slice(max(first, 0), last)
        V_r_least, V_s_least, theta = (
            RESERVE * float(values[:, inside].min()) for values in (V_r, V_s, v["theta"])
        )
        yield ShearStretch(axis + start + low, axis + start + high, V_r_least, V_s_least, theta)
