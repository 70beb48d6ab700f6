"""Tension with torsion along the bars as detailed, of the edge beam of the notebooks."""

from __future__ import annotations

import math
from dataclasses import replace

import numpy as np
import pytest

from lineproof import beams
from lineproof.beams.bars import BarLayer
from lineproof.beams.continuous.design import Design
from lineproof.beams.continuous.detailing_data import SectionBars, SupportTop, TorsionForces
from lineproof.beams.continuous.layout import BarRun
from lineproof.beams.continuous.resistance import stand
from lineproof.beams.continuous.resistance_torsion import worst_turned
from lineproof.record import Entry

from .edge_beam import TURNED, Edge, failing
from .flow import CALLS, start
from .laid import beam_of

TURN = 1.25 * 5.5 + 1.5 * 5.0
"""Torque per length of 1.25 D + 1.5 L [kN.m/m]."""
P_H, A_O = 2 * (288.7 + 528.7), 0.85 * 288.7 * 528.7
"""Perimeter [mm] and area [mm2] of the shear flow of 380 x 620 with 10M at 40 mm of cover."""


def force(design: Design, span: int, x: float, A_s: float) -> float:
    """Return the tension [N] at a station by 11.3.6.4, 11.3.9.2 and 11.3.10.5 to .6.

    The live load acts on the span; V_s is more than V_f, which is all that it may count.
    """
    found = [
        design.model.forces.demand(span, x, "left", row)
        for row, case in enumerate(design.model.forces.cases)
        if str(case).startswith("1.25D + 1.5L")
    ]
    M, V = max((each.M, abs(each.V)) for each in found)
    l_n = (7150, 7150)[span - 1]
    T = TURN * abs(l_n / 2 - (x - 225)) * 1e3
    d_v = 0.9 * (620 - 40 - 11.3 - 8)
    V_fe = math.hypot(V, 0.9 * P_H * T / (2 * A_O))
    eps_x = (max(M, V * d_v) / d_v + V_fe) / (2 * 200_000 * A_s)
    cot = 1 / math.tan(math.radians(29 + 7000 * eps_x))
    return M / d_v + math.hypot(V / 2, 0.45 * P_H * T / (2 * A_O)) * cot


def test_worst_station_of_the_tension_counts_torsion(edge_beam: Edge) -> None:
    """Bottom bars of span 1 at 2.525 m: 328.8 kN with torsion (by hand in test_edge_beam) of 340.

    Without torsion the most used station would be one of span 2 with 0.771.
    """
    entries = edge_beam[0].sheet.entries_of("coverage-bottom-tension")
    check = entries["bars-tension-side"]
    F = force(edge_beam[0].design, 1, 2525, 1000)
    assert pytest.approx(328.8e3, abs=50) == F
    assert check.value == (pytest.approx(F, rel=1e-9), pytest.approx(5 * 200 * 340))
    assert "2525 mm from the near support axis" in entries["place"].source.text
    worst = max(e.value[0] / e.value[1] for e in turned_checks(edge_beam[0]))
    assert worst == pytest.approx(F / 340e3)


def turned_checks(beam: beams.ContinuousBeam) -> list[Entry]:
    """Return the checks of bottom bars in tension of the sections of shear."""
    return [
        entries["bars-tension-side"]
        for part in beam.sheet.parts
        if part.key.startswith("shear-")
        for entries in [beam.sheet.entries_of(part.key)]
        if {"bars-tension-side", "case"} <= set(entries)
        and "bottom is in tension" in entries["case"].source.text
    ]


def test_table_of_the_bars_counts_torsion(edge_beam: Edge) -> None:
    """Span 1, 2.370 m: all five bars developed, and torsion on the straight line of 50 mm."""
    rows = edge_beam[0].sheet.entry("coverage/stations").source.content["rows"]
    (row,) = [row for row in rows if list(row[:2]) == ["1", "2.370"]]
    x = 2370.0
    F = [force(edge_beam[0].design, 1, at, 1000) for at in (2325.0, 2375.0)]
    between = F[0] + (F[1] - F[0]) * (x - 2325) / 50
    assert float(row[4]) == pytest.approx(between / 340e3, abs=0.005)
    assert "tension of 11.3.10.6" in edge_beam[0].sheet.entry("coverage/method").source.text


def test_no_shift_stands_for_shear_where_torsion_counts(edge_beam: Edge) -> None:
    """l_e of the bars cut over support 2 is d = 560.7 mm, not d_v cot theta (11.3.9.2)."""
    entries = edge_beam[0].sheet.entries_of("anchorage-top-2-left-cut-1")
    assert entries["l_e"].value == pytest.approx(560.7)
    assert "theta" not in entries
    assert "Torsion counts in this span" in entries["no-shift"].source.text


def test_bars_of_which_torsion_asks_too_much_fail_along_the_beam() -> None:
    """5-20M given in span 1 fail at the same section, with the same force, as in the shear."""
    beam = start(**(TURNED | {"bottom_bars": ["5-20M", None, None]}))
    for call in CALLS:
        getattr(beam, call)()
    entries = beam.sheet.entries_of("coverage-bottom-tension")
    F, F_r = entries["bars-tension-side"].value
    assert not entries["bars-tension-side"]
    assert pytest.approx(5 * 300 * 340) == F_r
    assert pytest.approx(max(e.value[0] for e in turned_checks(beam) if not e)) == F
    assert "coverage-bottom-tension/bars-tension-side" in failing(beam.sheet)


def test_bars_lapped_far_away_count_by_their_development_length(
    edge_beam: Edge,
) -> None:
    """At the largest moment of span 2, 4.2 m from a lap, l_d makes the bars whole, not l_s."""
    A_sd = edge_beam[0].sheet.entries_of("coverage-bottom")["A_sd"]
    assert {e.symbol for e in A_sd.args if e.symbol.startswith("l_")} == {"l_av", "l_d"}


def test_what_round_off_asks_where_no_bars_stand_hides_no_station() -> None:
    """0.4 kN beside bars that begin at 500 mm is nothing; at midspan 300 kN ask for 4-25M."""
    bare = beam_of((7000.0,), ("simple", "simple"))
    cases = len(bare.forces.cases)
    places, force = np.tile([100.0, 3500.0], (cases, 1)), np.tile([400.0, 300e3], (cases, 1))
    none, ends = np.zeros(2), np.zeros(cases)
    turned = TorsionForces(
        places[0], none, none, (ends, ends), 1.0, 1.0, places, (force, np.zeros_like(force))
    )
    bars = SectionBars(((BarLayer(4, "25M"),),), (SupportTop(), SupportTop()), "15M")
    designed = replace(bare, bars=bars, torsion={1: turned})
    standing = stand(designed, [BarRun("bottom", 1, 4, "25M", 500.0, 6500.0)])
    worst = worst_turned(designed, standing, "bottom", 1)
    assert worst is not None
    assert (worst.local, worst.F) == (3500.0, 300e3)
    assert worst.F_r == pytest.approx(4 * 500 * 0.85 * 400)
    assert worst_turned(designed, standing, "top", 1) is None
