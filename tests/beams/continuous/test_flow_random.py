"""Random beams, whole: a refusal in plain words, or a record that is redone to the last digit."""

from __future__ import annotations

from typing import Any

import pytest
from hypothesis import HealthCheck, Phase, given, settings
from hypothesis import strategies as st
from tests.beams.pocket import faults

from lineproof import beams
from lineproof.errors import UserError
from lineproof.record import Record, recompute

from .flow import run, start

random_beams = settings(
    max_examples=40, deadline=None, derandomize=True, database=None,
    phases=[Phase.explicit, Phase.generate], suppress_health_check=list(HealthCheck),
)  # fmt: skip
PAIRS = ("NBC 2015 + A23.3-14", "NBC 2020 + A23.3:19")
CURES = ("write ", "give ", "leave ", "use strut-and-tie")
"""What a refusal says to do."""


@st.composite
def supports_of(draw: st.DrawFn, spans: int) -> tuple[list[str], dict[int, list[str]]]:
    """Draw what carries the beam: columns, walls, girders, fixed walls, cantilever ends."""
    supports, columns = [], {}
    for number in range(1, spans + 2):
        end = number in (1, spans + 1)
        carrier = draw(st.sampled_from(["column", "girder", "wall"]))
        width = draw(st.sampled_from([300, 400, 450, 600]))
        text = f"{carrier} {width} mm"
        if end and carrier == "wall" and draw(st.booleans()):
            text += ", fixed"
        elif carrier == "column" and draw(st.booleans()):
            height, pinned = draw(st.integers(28, 45)) / 10, draw(st.sampled_from(["", ", pinned"]))
            columns[number] = [f"{width} mm x 500 mm x {height} m{pinned}"]
        supports.append(text)
    return supports, columns


@st.composite
def loads_of(draw: st.DrawFn, lengths: list[float]) -> list[dict[str, Any]]:
    """Draw single loads of all forms."""
    made: list[dict[str, Any]] = []
    for _ in range(draw(st.integers(0, 2))):
        span = draw(st.integers(1, len(lengths)))
        part = sorted(draw(st.tuples(st.floats(0.0, 0.45), st.floats(0.55, 1.0))))
        places = [f"{share * lengths[span - 1]:.1f} m" for share in part]
        load: dict[str, Any] = draw(
            st.sampled_from(
                [
                    {"point": f"{draw(st.integers(5, 60))} kN", "at": places[0], "span": span},
                    {"line": "6 kN/m", "from": places[0], "to": places[1], "span": span},
                    {"area": "2 kPa", "width": "1.2 m", "span": "all"},
                ]
            )
        )
        made.append({"type": draw(st.sampled_from(["D", "L", "S"])), **load})
    return made


@st.composite
def inputs_of(draw: st.DrawFn) -> dict[str, Any]:
    """Draw inputs as a designer types them, in sensible ranges."""
    count = draw(st.integers(1, 4))
    lengths = [draw(st.integers(45, 90)) / 10 for _ in range(count)]
    supports, columns = draw(supports_of(count))
    if count > 1 and draw(st.integers(0, 3)) == 0:
        lengths[0], supports[0] = draw(st.integers(12, 22)) / 10, "free"
        columns.pop(1, None)
    depths = [round(max(lengths) * 100 / draw(st.integers(11, 15))) * 10] * count
    if draw(st.booleans()):
        depths = [depth + draw(st.integers(0, 10)) * 10 for depth in depths]
    shape = draw(st.sampled_from(["T", "T", "L", "rectangular"]))
    grade = draw(st.sampled_from(["400R", "400W", "500R"]))
    methods = ["general"] if grade == "500R" else ["general", "simplified"]
    made: dict[str, Any] = {
        "spans": [f"{length} m" for length in lengths],
        "supports": supports,
        "columns": columns or None,
        "h": [f"{depth} mm" for depth in depths],
        "b_w": f"{draw(st.integers(35, 55)) * 10} mm",
        "shape": shape,
        "h_f": None if shape == "rectangular" else f"{draw(st.integers(130, 180))} mm",
        "floor_weight": "3.4 kPa" if shape == "rectangular" else None,
        "tributary_width": f"{draw(st.integers(12, 20)) / 10} m" if shape == "L" else None,
        "spacing": f"{draw(st.integers(22, 38)) / 10} m",
        "f_c": f"{draw(st.integers(25, 45))} MPa",
        "grade": grade,
        "shear_method": draw(st.sampled_from(methods)),
        "superimposed": f"{draw(st.integers(0, 30)) / 10} kPa",
        "use": draw(st.sampled_from(["office", "assembly area", "library stack room"])),
        "loads": draw(loads_of(lengths)),
        "cover": draw(st.sampled_from(["30 mm", "40 mm"])),
        "stirrup_legs": 2 if shape == "L" else draw(st.sampled_from([2, 2, 4])),
        "minimum_rule": draw(st.sampled_from(["10.5.1.1", "10.5.1.2"])),
        "snow": draw(st.sampled_from([None, "1.6 kPa"])),
        "slab_bars": None if shape == "rectangular" else "2 x 10M at 300 mm",
        "project": {"codes": {"pair": draw(st.sampled_from(PAIRS))}},
    }
    if shape == "L" and draw(st.booleans()):
        made |= {"torques": {"D": "2.1 kN.m"}, "closed_stirrups": True}
    return made


def test_random_beams() -> None:
    """No crash: refused with what to do, or recorded, redone by calculator, in agreement.

    A quarter of the beams at least are recorded, so that refusals alone do not pass.
    """
    recorded: list[bool] = []

    @random_beams
    @given(inputs=inputs_of())
    def each(inputs: dict[str, Any]) -> None:
        recorded.append(recorded_or_refused(inputs))

    each()
    assert sum(recorded) >= len(recorded) / 4 > 0


def recorded_or_refused(inputs: dict[str, Any]) -> bool:
    """Tell whether a beam is recorded; assert what holds of its record or of its refusal."""
    beam: beams.ContinuousBeam | None = None
    said: tuple[str, ...] = ()
    try:
        beam = start(**inputs)
        run(beam)
    except UserError as error:
        said = error.faults
    assert [fault for fault in said if not any(cure in fault for cure in CURES)] == []
    # What is chosen here can be bent: faults of bends are for bars that are given.
    assert [fault for fault in said if "has a leg of" in fault] == []
    if said or beam is None:
        return False
    record = beam.sheet.close()
    assert recompute(Record.from_text(record.to_text())) == []
    assert list(faults(record.data)) == []
    recorded_as_designed(beam)
    summary_shows_what_fails(record)
    return True


def recorded_as_designed(beam: beams.ContinuousBeam) -> None:
    """The moments on the page are those that the bars were chosen by."""
    forces = beam.model.forces
    for part in beam.sheet.parts:
        kind, _, place = part.key.partition("-")
        if kind == "sag" and "M_f" in part.entries:
            moment = forces.sag(int(place)).M
            M_f = part.entries["M_f"].value  # without its sign, also where no case sags
            assert M_f == pytest.approx(abs(moment), rel=1e-9, abs=1.0), part.key


def summary_shows_what_fails(record: Record) -> None:
    """Whatever fails is a check of the record, so that the package says FAILS."""
    assert all(record.entries[key]["kind"] == "check" for key in record.failed)
    assert all(not record.entries[key]["holds"] for key in record.failed)


def test_largest_moment_at_a_face() -> None:
    """A short span fixed at its left end beside a long one: its largest moment is at the wall.

    Under live load on span 2 alone the end moments of span 1 are M_1 and M_2 with
    V = w l/2 + (M_2 - M_1)/l < 0 all along, so the moment falls from the wall face on:
    M = M_1 + V x - w x**2/2 at x = 300 mm.
    """
    beam = start(
        spans=["3.0 m", "9.2 m", "7.4 m"], h="710 mm", b_w="520 mm",
        supports=["wall 600 mm, fixed", "column 450 mm", "column 450 mm", "wall 300 mm"],
    )  # fmt: skip
    run(beam, ("loads", "spans", "analysis", "flexure"))
    at = {
        symbol: e.value for symbol, e in beam.sheet.entries_of("sag-1").items() if e.kind == "line"
    }
    assert at["x_f"] == 300.0
    assert at["V_sn"] < 0
    by_hand = at["M_sn"] + at["V_sn"] * 300 - at["w_f"] * 300**2 / 2
    assert at["M_f"] == pytest.approx(by_hand, rel=1e-12)
    assert at["M_f"] == pytest.approx(beam.model.forces.sag(1).M, rel=1e-9)
