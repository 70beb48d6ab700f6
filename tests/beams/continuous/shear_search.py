"""Every choice of stirrups tried: the lightest that holds, by brute force."""

from __future__ import annotations

import math
from itertools import product

import numpy as np

from lineproof.beams.continuous.shear_choice import Fitting, choose_layouts
from lineproof.beams.continuous.shear_state import SpanState
from lineproof.beams.continuous.stirrups import SpanLayout, grid, lay
from lineproof.errors import UserError


def assert_lightest(states: list[SpanState]) -> None:
    """Find no lighter choice than the one made; where none is made, none holds."""
    fits = [Fitting.of(state) for state in states]
    try:
        layouts = choose_layouts(states)
    except UserError:
        hopeless = any(state.hopeless.max() > 1 for state in states)
        assert hopeless or lightest(fits)[0] == math.inf
        return
    mass = sum(x.number * fit.weight for x, fit in zip(layouts, fits, strict=True))
    assert all(stands(fit, x) for fit, x in zip(fits, layouts, strict=True))
    assert (round(mass, 3), sum(x.zones for x in layouts)) == lightest(fits)


def lightest(fits: list[Fitting]) -> tuple[float, int]:
    """Return mass and zones of the best choice, by trying every pair and every length."""
    spacings = grid(fits[0].d_bs)
    best = (math.inf, 0)
    for end, spacing in product(spacings, spacings):
        if spacing < end:
            continue
        found = [fewest(fit, end, spacing) for fit in fits]
        mass = sum(n * fit.weight for (n, _), fit in zip(found, fits, strict=True))
        best = min(best, (mass if mass == math.inf else round(mass, 3), sum(z for _, z in found)))
    return best


def fewest(fit: Fitting, end: float, spacing: float) -> tuple[float, int]:
    """Return the fewest stirrups, then zones, over end zones of any length that hold."""
    uniform_one = lay(fit.clear, end, end, 0, 0, fit.d_bs)
    assert uniform_one is not None
    if not stands(fit, uniform_one):
        return math.inf, 0  # where the closer spacing alone fails, so does any with a wider one
    best = uniform_one.number, uniform_one.zones
    most = int(fit.clear / end)
    for left, right in product(range(most + 1), range(most + 1)):
        layout = lay(fit.clear, end, spacing, left, right, fit.d_bs)
        if layout is not None and (layout.number, layout.zones) < best and stands(fit, layout):
            best = layout.number, layout.zones
    return best


def stands(fit: Fitting, layout: SpanLayout) -> bool:
    """Tell whether a layout holds at every station, the wide spacing one station further."""
    a, b = layout.left_end, layout.right_start
    low = fit.u[fit.u <= a + 1e-9].max() if layout.left else 0.0
    high = fit.u[fit.u >= b - 1e-9].min() if layout.right else fit.clear
    wide = (fit.u >= low) & (fit.u <= high)
    if (fit.required[wide] * layout.spacing > 1 + 1e-12).any():
        return False
    if (fit.allowed[wide] < layout.spacing * (1 - 1e-12)).any():
        return False
    for inside, change in ((fit.u <= a, a), (fit.u >= b, b)):
        if not inside.any() or change in (0.0, fit.clear):
            continue
        if (fit.allowed[inside] < layout.end * (1 - 1e-12)).any():
            return False
        part = np.minimum(np.abs(fit.u[inside] - change) / fit.h, 0.5)
        counted = (0.5 + part) / layout.end + (0.5 - part) / layout.spacing
        if layout.end == layout.spacing:
            counted = np.full_like(part, 1 / layout.end)
        if (fit.required[inside] > counted * (1 + 1e-12)).any():
            return False
    return True
