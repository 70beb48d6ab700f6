"""What is proposed holds its own checks: beams met by random search whose proposals once did not.

A check that only the inputs can mend (deflection, cover of the slab for fire, slab bars given for
the interface) may fail; any other may not.
"""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any

import numpy as np
import pytest

from lineproof.beams.continuous.cutoff import shear_in_tension

from .flow import record_of, start

OF_THE_INPUTS = ("deflection-", "cover/", "interface-")
GIRDERS = ["girder 400 mm", "girder 450 mm", "girder 450 mm", "girder 400 mm"]
STORAGE: Mapping[str, Any] = {
    "spans": ["3.8 m", "6.0 m", "6.6 m", "1.3 m"],
    "supports": ["wall 600 mm", "wall 300 mm", "column 300 mm", "wall 400 mm", "free"],
    "h": ["550 mm", "390 mm", "410 mm", "470 mm"], "b_w": "530 mm", "h_f": "198 mm",
    "spacing": "4.5 m", "f_c": "49 MPa", "superimposed": "4.0 kPa", "partitions": "1.0 kPa",
    "construction_load": "2.4 kPa", "use": "library stack room", "shear_method": "simplified",
    "minimum_rule": "10.5.1.1", "aggregate": "14 mm",
    "loads": [{"type": "D", "span": 3, "line": "2 kN/m"},
              {"type": "S", "span": "all", "area": "5 kPa", "width": "1.2 m"}],
}  # fmt: skip
"""Top bars cut where the top is in tension in some cases, the largest shear in others."""
UNLIKE: Mapping[str, Any] = {
    "spans": ["1.5 m", "4.0 m", "5.1 m", "8.0 m"],
    "supports": ["free", "girder 300 mm", "column 450 mm", "column 400 mm", "wall 300 mm"],
    "columns": {3: "450 mm x 300 mm x 4.4 m, pinned", 4: "400 mm x 500 mm x 3.9 m"},
    "h": "730 mm", "b_w": "360 mm", "h_f": "122 mm", "spacing": "4.3 m", "f_c": "39 MPa",
    "grade": "400W", "superimposed": "0.3 kPa", "partitions": "1.0 kPa",
    "construction_load": "2.4 kPa", "cover": "40 mm", "minimum_rule": "10.5.1.1",
    "loads": [{"type": "S", "span": 2, "line": "5 kN/m"}],
}  # fmt: skip
"""Bars of two supports that meet in a span where only the long ones of one go on."""


@pytest.mark.parametrize(
    "changes",
    [
        {"supports": GIRDERS},
        {"supports": GIRDERS, "use": "storage area"},
        {"spans": ["6 m", "6 m"], "supports": ["girder 400 mm"] * 3},
        {"spans": ["8 m"], "supports": ["girder 400 mm"] * 2},
        STORAGE,
        UNLIKE,
    ],
)
def test_a_proposal_holds_its_own_checks(changes: Mapping[str, Any]) -> None:
    record = record_of(**changes)
    assert len(record.entries) > 500
    assert [key for key in record.failed if not key.startswith(OF_THE_INPUTS)] == []


def test_more_bars_at_an_inner_girder_are_told_with_the_reason() -> None:
    """At the face of a girder the bars carry moment and shear together (11.3.9)."""
    told = record_of(supports=GIRDERS).entries["stirrups/more-bars"]["text"]
    assert told.startswith("More bars than the moments ask for: support")
    assert "support 2: " in told
    assert "girder" in told
    assert "stirrups/more-bars" not in record_of().entries


def test_only_shear_of_the_cases_that_pull_the_face_counts_at_a_cut() -> None:
    """Two cases at two places: the first pulls the face at the first place, neither at the other.

    The shear of 90 kN belongs to a case that presses the face.
    """
    M = np.array([[2e6, -1e6], [-5e6, -3e6]])
    V = np.array([[-60e3, 10e3], [90e3, 20e3]])
    assert shear_in_tension(M, V).tolist() == [[60e3, 0.0], [0.0, 0.0]]


def test_ties_around_hooks_are_checked_at_the_spacing_they_are_laid() -> None:
    """20M: 3 x 19.5 = 58.5, down to 55 mm; 11.3 + 30 = 41.3 lets the concrete pass."""
    beam = start()
    for call in ("loads", "spans", "analysis", "flexure", "shear", "anchorage"):
        getattr(beam, call)()
    entries = beam.sheet.entries_of("anchorage-end-1-hook-20m")
    ties = [zone for zone in beam.design.detailing.stirrups if zone.start < 0]
    assert [zone.spacing for zone in ties] == [55.0]
    assert entries["s_tie"].value == 55.0
    assert entries["hook-ties"].value == (pytest.approx(55.0), pytest.approx(58.5))
    assert entries["hook-ties-clear"].value == (pytest.approx(55.0), pytest.approx(41.3))
