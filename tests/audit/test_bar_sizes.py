"""Depths worked with the sizes of bars for their diameters: 10M is 11.3 mm, 20M is 19.5 mm.

The demo beam of the flow: h 620, cover 30, stirrups 10M, bars 20M, so that d = 620 - 30 - 11.3 -
19.5/2 = 568.95 mm, and 620 - 30 - 10 - 20/2 = 570 mm by the sizes.
"""

from __future__ import annotations

from functools import cache

import pytest
from tests.audit.hand import judged, typed
from tests.beams.continuous import flow

from lineproof.audit.audit import audit_claims
from lineproof.audit.data import Judged, Severity, Verdict
from lineproof.audit.graph import Graph
from lineproof.record import Record


@cache
def record() -> Record:
    return flow.record_of()


def said(**texts: str) -> dict[str, Judged]:
    return judged(record(), {f"sag-1/{symbol}": text for symbol, text in texts.items()})


def test_the_depth_is_that_of_the_diameters() -> None:
    values = record().entries
    assert values["sag-1/d"]["value"] == pytest.approx(620 - 30 - 11.3 - 19.5 / 2)


@pytest.mark.parametrize("text", ["570 mm", "570.0 mm"])
def test_a_depth_by_the_sizes_of_all_bars_is_a_rounding_and_no_origin(text: str) -> None:
    """A larger depth raises M_r: it errs to the unsafe side, by 1 in 569."""
    found = said(d=text)["sag-1/d"]

    assert found.verdict is Verdict.UNSAFE_ROUNDING
    assert found.note == (
        "worked with the sizes of the bars for their diameters, 10 for 11.3 mm and 20 for 19.5 mm: "
        "not conservative"
    )


def test_it_is_so_beside_a_bar_claimed_by_its_size_too() -> None:
    found = said(d_b="20 mm", d="570 mm")

    assert found["sag-1/d_b"].verdict is Verdict.INPUT
    assert found["sag-1/d"].verdict is Verdict.UNSAFE_ROUNDING


def test_beside_a_bar_claimed_by_its_diameter_it_is_not() -> None:
    assert "sizes of the bars" not in said(d_b="19.5 mm", d="570.0 mm")["sag-1/d"].note


def test_one_bar_alone_by_its_size_is_a_slip() -> None:
    """620 - 30 - 10 - 19.5/2 = 570.25 mm: the bar by its diameter, the stirrup by its size."""
    assert said(d="570.25 mm")["sag-1/d"].verdict is Verdict.ORIGIN


def test_the_finding_says_what_was_done_and_that_it_matters_little() -> None:
    graph = Graph(record())
    (finding,) = audit_claims(record(), [typed(graph, "sag-1/d", "570 mm")], graph).findings

    assert finding.severity is Severity.MINOR
    assert "570 mm is worked with the sizes of the bars for their diameters" in finding.what
