"""Moments and torques that supports take, unfactored: statics of the whole beam, and by hand."""

from __future__ import annotations

from itertools import accumulate

import pytest

from lineproof.record import Record

from . import flow

SPANS = (7.0, 8.0)


@pytest.fixture(scope="module")
def record() -> Record:
    """An edge beam: two columns with stiffness, a fixed wall, torques."""
    beam = flow.start(
        spans=["7 m", "8 m"], supports=["column 400 mm", "column 400 mm", "wall 600 mm, fixed"],
        columns={1: ["400 mm x 400 mm x 3.5 m"], 2: ["400 mm x 400 mm x 3.5 m"]},
        shape="L", tributary_width="1.5 m", closed_stirrups=True,
        torques={"D": "4 kN.m", "L": "2 kN.m"},
    )  # fmt: skip
    return flow.run(beam).close()


def value(record: Record, symbol: str, part: str = "analysis") -> float:
    """Return a recorded value in kN and m."""
    entry = record.entries[f"{part}/{symbol}"]
    assert entry["unit"] in ("kN", "kN.m", "kN/m")
    return float(entry["printed"]["result"])


def test_moments_of_the_whole_beam_balance(record: Record) -> None:
    """Moments about support 1, clockwise: loads, less reactions and what the supports take."""
    loads = [value(record, f"w_D{k}", "loads") for k in (1, 2)]
    starts = [0.0, *accumulate(SPANS)]
    acting = sum(
        w * length * (start + length / 2)
        for w, length, start in zip(loads, SPANS, starts, strict=False)
    )
    reactions = sum(value(record, f"R_{j}D") * starts[j - 1] for j in (1, 2, 3))
    taken = sum(value(record, f"M_c{j}D") for j in (1, 2, 3))

    assert acting - reactions - taken == pytest.approx(
        0.0, abs=0.6
    )  # 98.6 to 0.05 at 7 m, 48.25 to 0.005 at 15 m, moments to 0.05
    assert abs(taken) > 20.0  # so that a wrong sign would be seen


def test_live_load_stands_where_it_raises_the_moment(record: Record) -> None:
    """Of both spans, those of one sign: at the middle column one span each way."""
    by_span = [value(record, f"M_c2L{k}") for k in (1, 2)]

    assert by_span[0] < 0 < by_span[1]
    assert value(record, "M_c2L") == by_span[1]
    assert value(record, "M_cm2L") == by_span[0]


def test_torques_go_to_the_nearer_support(record: Record) -> None:
    """4 kN.m/m over 7 and 8 m: 14, 14 + 16 and 16 kN.m; together 4 x 15 = 60."""
    found = [value(record, f"T_c{j}D", "torques-supports") for j in (1, 2, 3)]

    assert found == [14.0, 30.0, 16.0]


def test_the_table_gives_them_by_load_type(record: Record) -> None:
    table = record.entries["summary/support-moments"]

    assert table["columns"] == [
        "Support", "On", "M, dead load, kN.m", "largest M, live load, kN.m",
        "least M, live load, kN.m", "T, dead load, kN.m", "largest T, live load, kN.m",
    ]  # fmt: skip
    assert [row[:2] for row in table["rows"]] == [["1", "column"], ["2", "column"], ["3", "wall"]]
    torques = [row[5:] for row in table["rows"]]
    assert torques == [["14.0", "7.00"], ["30.0", "15.0"], ["16.0", "8.00"]]


def test_a_span_between_fixed_walls() -> None:
    """By hand: w l**2/12 at both ends, clockwise at the left one."""
    supports = ["wall 600 mm, fixed", "wall 600 mm, fixed"]
    beam = flow.start(spans=["6 m"], supports=supports)
    record = flow.close_anyway(flow.run(beam, ("loads", "spans", "analysis")))
    w = value(record, "w_D1", "loads")

    assert value(record, "M_c1D") == pytest.approx(w * 6**2 / 12, rel=5e-3)  # three printed digits
    assert value(record, "M_c2D") == pytest.approx(-w * 6**2 / 12, rel=5e-3)


def test_supports_that_are_free_to_rotate_take_none() -> None:
    beam = flow.start(spans=["6 m", "6 m"], supports=["wall 300 mm"] * 3)
    record = flow.close_anyway(flow.run(beam, ("loads", "spans", "analysis")))

    assert [key for key in record.entries if key.startswith("analysis/M_c")] == []


def test_the_torque_of_an_overhang_goes_to_its_support() -> None:
    """4 kN.m/m over an overhang of 1.5 m and a span of 7 m: 4 x (1.5 + 3.5) = 20 kN.m."""
    beam = flow.start(
        spans=["1.5 m", "7 m"], supports=["free", "column 400 mm", "column 400 mm"],
        shape="L", tributary_width="1.5 m", closed_stirrups=True, torques={"D": "4 kN.m"},
    )  # fmt: skip
    record = flow.close_anyway(flow.run(beam, flow.CALLS[: flow.CALLS.index("shear") + 1]))

    assert value(record, "T_c2D", "torques-supports") == 20.0
    assert value(record, "T_c3D", "torques-supports") == 14.0


def test_equal_moments_of_both_spans_leave_nothing() -> None:
    """Two alike spans on columns: by symmetry the middle one takes none under dead load.

    Equal moments leave the rounding of their last bits, 1e-14 kN.m, other ones on each processor.
    """
    spans, support = ["6 m", "6 m"], "column 450 mm"
    columns = {j: ["450 mm x 450 mm x 3.6 m"] for j in (1, 2, 3)}
    beam = flow.start(spans=spans, supports=[support] * 3, columns=columns)
    made = flow.run(beam).close()
    assert made.entries["analysis/M_c2D"]["printed"]["result"] == "0"
    (table,) = [
        entry
        for entry in made.entries.values()
        if entry["kind"] == "table" and "M, dead load, kN.m" in entry["columns"]
    ]
    at = table["columns"].index("M, dead load, kN.m")
    one, middle, last = (float(row[at]) for row in table["rows"])
    assert middle == 0
    assert one == pytest.approx(-last, rel=5e-3)  # three digits
    assert one > 1
