"""Demand over resistance along a beam: nothing asked is 0, something against nothing infinite."""

from __future__ import annotations

import numpy as np

from lineproof.beams.analysis.curves import Floats
from lineproof.beams.continuous.resistance_demand import NOTHING


def ratio_of(demand: float, provided: float) -> float:
    """Return demand over resistance of a moment [N.mm] or a force [N]."""
    if demand <= NOTHING:
        return 0.0
    return demand / provided if provided > 0 else float("inf")


def ratios_of(demand: Floats, provided: Floats) -> Floats:
    """Return demand over resistance at every station, as :func:`ratio_of` does of one."""
    needed = demand > NOTHING
    with np.errstate(divide="ignore", invalid="ignore"):
        made: Floats = np.where(needed, np.where(provided > 0, demand / provided, np.inf), 0.0)
    return made
