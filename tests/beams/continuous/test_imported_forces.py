"""Imported forces as numbers: our own solution written as a file and read again, and by hand."""

from __future__ import annotations

from pathlib import Path
from typing import Any

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from lineproof.beams.analysis.imported import read_forces
from lineproof.beams.analysis.model import (
    FREE,
    SIMPLE,
    Beam,
    Load,
    PointLoad,
    Span,
    Support,
    UniformLoad,
)
from lineproof.beams.continuous.forces import Forces
from lineproof.beams.continuous.imported_forces import ForcesFile, ImportedForces, imported_forces
from lineproof.beams.continuous.imported_restraint import span_loads
from lineproof.beams.continuous.shear_state import near_point_loads
from lineproof.errors import UserError

from ..analysis.random_beams import beams, loads_on, repeatable  # noqa: TID252 - shared strategies
from .flow import CALLS, run, start
from .frame_files import HEADER, Torsion, no_torsion, rows_of, write

EXACT = 1e-9
COLUMN = Support("simple", 450.0)


def read(beam: Beam, lines: list[str]) -> ImportedForces:
    """Read lines of a file of forces for a beam."""
    content = "\n".join([HEADER, *lines]).encode()
    imported = read_forces(content, [span.length for span in beam.spans])
    return imported_forces(beam, ForcesFile("frame.csv", "0" * 64, imported))


def again(own: Forces, *, decimals: int = 6, torsion: Torsion = no_torsion) -> ImportedForces:
    """Return our own forces as they come in again from a file."""
    return read(own.beam, rows_of(own, decimals=decimals, torsion=torsion))


def two_spans() -> Forces:
    beam = Beam((Span(8000.0, 8e13), Span(6000.0, 8e13)), (COLUMN,) * 3)
    loads: list[Load] = [
        UniformLoad("D", 1, 30.0), UniformLoad("D", 2, 30.0), UniformLoad("L", 1, 20.0),
        UniformLoad("L", 2, 20.0), PointLoad("D", 1, 80e3, 600.0), PointLoad("L", 1, 40e3, 600.0),
    ]  # fmt: skip
    return Forces.of(beam, loads)


def by_hand(ordinates: list[tuple[float, float, float]]) -> list[str]:
    """Write one case of one span: x [m], M [kN.m], V [kN]."""
    return [f"1,{x!r},wind east,1.0D + 1.0E,{M!r},{V!r},0" for x, M, V in ordinates]


def sway(M_0: float, V_0: float, w: float = 30.0, length: float = 8.0) -> list[str]:
    """Write M = M_0 + V_0 x - w x^2/2 and V = V_0 - w x, of statics, at tenths of the span."""
    places = [length * n / 10 for n in range(11)]
    return by_hand([(x, M_0 + V_0 * x - w * x * x / 2, V_0 - w * x) for x in places])


@repeatable
@given(st.data())
def test_any_beam_comes_in_as_it_went_out(data: st.DataObject) -> None:
    """Rounded to 1e-6 kN and kN.m: M differs by half of that, and what w moves it between."""
    beam = data.draw(beams())
    own = Forces.of(beam, data.draw(loads_on(beam)))
    found = again(own)
    places = [data.draw(st.floats(0.0, 1.0)) for _ in range(3)]
    for span in range(1, len(beam.spans) + 1):
        x = np.array(places) * beam.spans[span - 1].length
        x = x[np.abs(x[:, None] - own.solved.solution.span(span).breaks).min(axis=1) > 0.01]
        M, V = found.along(span, x)
        M_own, V_own = own.along(span, x)
        assert np.abs(M - M_own).max(initial=0.0) < 1.0
        assert np.abs(V - V_own).max(initial=0.0) < 0.002
        assert pytest.approx(own.sag(span).M, rel=EXACT, abs=1.0) == found.sag(span).M


def test_moments_and_shears_at_the_stations_are_those_of_the_file() -> None:
    found = again(two_spans(), decimals=1)
    envelope = found.source.imported.envelope
    for n, station in enumerate(envelope.stations):
        M, V = found.pairs(station.span, station.x, station.side)
        scale = np.abs(envelope.M).max()
        assert np.abs(M - envelope.M[:, n]).max() < EXACT * scale
        assert np.abs(V - envelope.V[:, n]).max() < EXACT * np.abs(envelope.V).max()


def test_moment_has_no_step_where_the_file_is_rounded_coarsely() -> None:
    """Whole kN.m and kN: on both sides of a station the same moment."""
    found = again(two_spans(), decimals=0)
    inner = found.solved.solution.span(1).breaks[1:-1]
    before, _ = found.along(1, inner - 1e-4)
    after, _ = found.along(1, inner + 1e-4)
    # V of at most 400 kN over 2e-4 mm: 80 N.mm.
    assert np.abs(before - after).max() < 80.0


def test_largest_moment_between_two_stations_by_hand() -> None:
    """M = -20 + 95 x - 15 x^2 is level at 95/30 = 3.1667 m: -20 + 95^2/60 = 130.4167 kN.m."""
    beam = Beam((Span(8000.0, 1e13),), (COLUMN, COLUMN))
    demand = read(beam, sway(-20.0, 95.0)).sag(1)
    assert demand.x == pytest.approx(95 / 30 * 1000, rel=EXACT)
    assert pytest.approx((-20 + 95**2 / 60) * 1e6, rel=EXACT) == demand.M
    assert pytest.approx(0.0, abs=1e-3) == demand.V


def test_lateral_case_with_the_bottom_in_tension_over_a_support_by_hand() -> None:
    """M = 300 - 90 x - 2 x^2 falls from the left: the largest moment stands at the face, 0.225 m.

    300 - 90 x 0.225 - 2 x 0.225^2 = 279.64875 kN.m; at the right axis M is -548 kN.m.
    """
    beam = Beam((Span(8000.0, 1e13),), (COLUMN, COLUMN))
    forces = read(beam, sway(300.0, -90.0, 4.0))
    sag, hog = forces.sag(1), forces.hog(2, "left")
    assert (sag.x, sag.M) == pytest.approx((225.0, 279.64875e6), rel=EXACT)
    assert pytest.approx(279.64875e6, rel=EXACT) == forces.hog(1, "right").M
    # 300 - 90 x 7.775 - 2 x 7.775^2 = -520.65125 kN.m at the face.
    assert pytest.approx(-520.65125e6, rel=EXACT) == hog.M
    assert str(hog.case) == "1.0D + 1.0E, wind east"


def test_reactions_and_couples_are_the_jumps_over_the_supports() -> None:
    """Columns take couples: M jumps over the middle support from -100 to -60 kN.m, V by 200 kN."""
    beam = Beam((Span(8000.0, 1e13), Span(8000.0, 1e13)), (SIMPLE,) * 3)
    left = [f"1,{x!r},a,b,{-12.5 * x!r},-12.5,0" for x in range(9)]
    right = [f"2,{x!r},a,b,{-60 + 7.5 * x!r},7.5,0" for x in range(9)]
    solution = read(beam, left + right).solved.solution
    assert solution.reactions[0].tolist() == pytest.approx([-12500.0, 20000.0, -7500.0], rel=EXACT)
    assert solution.couples[0].tolist() == pytest.approx([0.0, 40e6, 0.0], abs=1e-3)


def test_point_loads_of_the_file_count_near_a_support() -> None:
    """1.25 x 80 + 1.5 x 40 = 160 kN at 0.6 m from the axis, 0.375 m from the face."""
    own = two_spans()
    found = again(own)
    near = near_point_loads(found, 1, "left", 225.0, 500.0)
    assert near == pytest.approx(near_point_loads(own, 1, "left", 225.0, 500.0), abs=0.01)
    assert near.max() == pytest.approx(160e3, abs=0.01)
    assert near_point_loads(found, 1, "left", 225.0, 300.0).max() == 0.0


def test_two_stations_close_to_each_other_are_a_point_load() -> None:
    """V falls by 80 kN between 2.999 and 3.001 m: a point load of 80 kN at 2.999 m."""
    rows = [(x, 50.0 * x, 50.0) for x in (0.0, 1.0, 2.0, 2.999)]
    rows += [(x, 150.0 - 30.0 * (x - 3.0), -30.0) for x in (3.001, 4.0, 5.0, 6.0, 7.0, 8.0)]
    beam = Beam((Span(8000.0, 1e13),), (COLUMN, COLUMN))
    loads = read(beam, by_hand(rows)).loads
    found = [(load.at, load.P) for load in loads if isinstance(load, PointLoad)]
    assert len(found) == 1
    assert found[0] == pytest.approx((2999.0, 80e3))


def test_load_on_a_span_with_its_point_loads_twice() -> None:
    """1.25 x 30 + 1.5 x 20 = 67.5 kN/m and 160 kN: 67.5 + 2 x 160/8 = 107.5 kN/m."""
    assert span_loads(again(two_spans()), 1).max() == pytest.approx(107.5, rel=1e-6)
    assert span_loads(again(two_spans()), 2).max() == pytest.approx(67.5, rel=1e-6)


def test_torsion_is_taken_on_the_straight_line() -> None:
    """T from 30 kN.m at the left axis to -30 kN.m at the right: at 2.1 m of 8 m 30 - 15.75."""
    found = again(two_spans(), torsion=lambda span, x: 30.0 - 7.5 * x / 1e3 if span == 1 else 0.0)
    assert found.has_torsion(1)
    assert not found.has_torsion(2)
    at = np.array([0.0, 2100.0, 8000.0])
    T = found.imported_torsion(1, at)
    assert T.shape == (len(found.cases), 3)
    assert np.abs(T - np.array([30e6, 14.25e6, -30e6])).max() < 1e-3
    each = np.tile(at, (len(found.cases), 1))
    assert np.array_equal(found.imported_torsion(1, each), T)
    assert not found.imported_torsion(2, at).any()


def test_larger_torsion_counts_where_it_jumps() -> None:
    rows = [
        f"1,{x},a,b,0,0,{T}" for x, T in ((0, 5), (1, 5), (2, 5), (3, 5), (4, 5), (4, -9),
                                          (5, -9), (6, -9), (7, -9), (8, -9))
    ]  # fmt: skip
    forces = read(Beam((Span(8000.0, 1e13),), (COLUMN, COLUMN)), rows)
    found = forces.imported_torsion(1, np.array([3999.0, 4000.0, 4001.0]))
    assert found[0].tolist() == pytest.approx([5e6, -9e6, -9e6])


@pytest.mark.parametrize("what", ["slope", "deflection"])
def test_deflections_are_refused(what: str) -> None:
    curves: Any = again(two_spans()).solved.solution.span(1)
    with pytest.raises(UserError, match="forces_csv: deflections cannot be found"):
        getattr(curves, what)(np.array([4000.0]))


def test_gaps_that_each_pass_but_add_up_are_found() -> None:
    """V is 4 % too large all along: 1.82 kN.m in the first 0.4 m, of 2.4 that are let pass."""
    rows = [
        (x, 120.0 * x - 15.0 * x * x, 1.04 * (120.0 - 30.0 * x))
        for x in (0.4 * n for n in range(21))
    ]
    with pytest.raises(UserError, match=r"0 to 0\.8 m: M changes by"):
        read(Beam((Span(8000.0, 1e13),), (SIMPLE, SIMPLE)), by_hand(rows))


def test_cantilever_comes_in() -> None:
    """A tip load of 20 kN on 2 m: -40 kN.m at the axis, -20 x 1.775 = -35.5 kN.m at the face."""
    beam = Beam((Span(2000.0, 1e13), Span(8000.0, 1e13)), (FREE, COLUMN, COLUMN))
    tip = [f"1,{x / 4!r},a,b,{-20.0 * x / 4!r},-20.0,0" for x in range(9)]
    rest = [f"2,{x!r},a,b,{-40.0 + 5.0 * x!r},5.0,0" for x in range(9)]
    hog = read(beam, tip + rest).hog(2, "left")
    assert pytest.approx((-35.5e6, -20e3), rel=EXACT) == (hog.M, hog.V)


def test_a_point_torque_near_a_support_takes_the_section_to_the_face(tmp_path: Path) -> None:
    """30 kN.m at 0.5 m of 8 m, both ends held: 30*7.5/8 = 28.125 on the left, -1.875 on the right.

    The wall is 0.3 m wide: the face stands at 0.15 m, and 0.15 + d_v is beyond 0.5 m. Between face
    and torque the torsion is 28.125 kN.m, not the 1.875 kN.m at d_v, which would not even count.
    """
    lines, w = [], 40.0
    stations = sorted({*(n * 0.4 for n in range(21)), 0.5})
    for x in stations:
        M, V = w * x * (8.0 - x) / 2, w * (4.0 - x)
        torsions = (28.125, -1.875) if x == 0.5 else (28.125,) if x < 0.5 else (-1.875,)
        lines += [f"1,{x:.3f},all,1.25D + 1.5L,{M:.6f},{V:.6f},{T}" for T in torsions]
    beam = start(
        spans=["8 m"], supports=["wall 300 mm"] * 2, forces_csv=write(tmp_path / "f.csv", lines),
        closed_stirrups=True, torsion="equilibrium",
    )  # fmt: skip
    run(beam, CALLS[:5])

    left, right = (beam.sheet.entries_of(f"shear-1-{end}") for end in ("left", "right"))
    assert left["x_f"].value == 150.0
    assert left["T_f"].value == pytest.approx(28.125e6)
    assert left["torsion-counts"]
    assert right["x_f"].value > 600.0
    assert right["T_f"].value == pytest.approx(1.875e6)
