"""The whole flow: every check holds, every line is redone, cells in any order and again."""

from __future__ import annotations

from collections.abc import Iterable
from typing import Any

import pytest
from hypothesis import HealthCheck, Phase, given, settings
from hypothesis import strategies as st
from tests.beams.pocket import faults

from lineproof import beams
from lineproof.errors import UserError
from lineproof.record import Record, recompute

from .flow import CALLS, MIXED, record_of, run, start

orders = settings(
    max_examples=8, deadline=None, derandomize=True, database=None,
    phases=[Phase.explicit, Phase.generate], suppress_health_check=list(HealthCheck),
)  # fmt: skip
TORSION = {
    "shape": "L", "tributary_width": "1.7 m", "closed_stirrups": True,
    "torques": {"D": "1.4 kN.m", "L": "0.9 kN.m"},
}  # fmt: skip


def test_every_check_of_the_three_spans_holds(floor: Record) -> None:
    """Bars and stirrups chosen pass every check; the chapters have them all."""
    assert floor.failed == []
    checks = [e for e in floor.entries.values() if e["kind"] == "check"]
    parts = {check["id"].partition("/")[0] for check in checks}
    wanted = {f"{what}-{k}" for k in (1, 2, 3) for what in ("sag", "deflection")}
    wanted |= {f"{what}-{k}-{side}" for what in ("shear",) for k in (1, 2, 3)
               for side in ("left", "right")}  # fmt: skip
    wanted |= {"hog-1-right", "hog-2-left", "hog-2-right", "hog-3-left", "hog-3-right",
               "hog-4-left", "cover", "coverage-bottom", "coverage-top"}  # fmt: skip
    assert wanted <= parts
    assert len(checks) > 150


@pytest.mark.parametrize(
    "changes",
    [{}, MIXED, TORSION, {"shear_method": "simplified"},
     {"shape": "rectangular", "h_f": None, "floor_weight": "3.4 kPa"},
     {"use": "library stack room", "snow": "1.6 kPa", "construction_load": "2.4 kPa"},
     {"redistribution": {2: 10, 3: 10}}],
    ids=["three spans", "mixed", "torsion", "simplified", "rectangular", "storage", "moved"],
)  # fmt: skip
def test_the_record_is_redone_from_what_is_printed(changes: dict[str, Any]) -> None:
    """It recomputes from its givens, and a pocket calculator redoes every printed line."""
    record = record_of(**changes)
    assert recompute(Record.from_text(record.to_text())) == []
    assert list(faults(record.data)) == []


def refusals(beam: beams.ContinuousBeam, calls: Iterable[str]) -> list[str]:
    """Make the calls one after the other; return what those too early said."""
    said: list[str] = []
    for call in calls:
        try:
            getattr(beam, call)()
        except UserError as error:
            said += error.faults
    return said


def unclosed(beam: beams.ContinuousBeam) -> tuple[str, ...]:
    """Return why the sheet does not close."""
    try:
        beam.sheet.close()
    except UserError as error:
        return error.faults
    return ()


@st.composite
def call_orders(draw: st.DrawFn) -> list[str]:
    """Draw all calls in any order, some of them again."""
    again = draw(st.lists(st.sampled_from(CALLS), max_size=6))
    return draw(st.permutations([*CALLS, *again]))


@orders
@given(calls=call_orders())
def test_any_order(floor: Record, calls: list[str]) -> None:
    """A call too early says which call to run first; closing gives the same lines or refuses."""
    beam = start()
    said = refusals(beam, calls)
    assert [text for text in said if "run beam." not in text] == []
    assert [text for text in unclosed(beam) if "run " not in text] == []
    if not unclosed(beam):
        assert beam.sheet.close().digest == floor.digest
    run(beam)
    assert beam.sheet.close().digest == floor.digest


@orders
@given(extra=st.lists(st.sampled_from(CALLS), max_size=8))
def test_cells_run_again_change_nothing(floor: Record, extra: list[str]) -> None:
    beam = start()
    run(beam)
    run(beam, extra)
    assert beam.sheet.close().digest == floor.digest


@pytest.mark.parametrize("left_out", CALLS)
def test_closing_before_a_chapter_is_run_names_the_call(left_out: str) -> None:
    """Without one chapter the sheet does not close, and says which call to run."""
    beam = start()
    refusals(beam, [call for call in CALLS if call != left_out])
    with pytest.raises(UserError, match=rf"run beam\.{left_out}\(\)"):
        beam.sheet.close()


@pytest.mark.parametrize("call", CALLS[1:])
def test_a_call_alone_names_what_to_run(call: str) -> None:
    """Alone after the inputs it works or names what to run; closing names all that is missing."""
    beam = start()
    assert [text for text in refusals(beam, [call]) if "run beam." not in text] == []
    with pytest.raises(UserError, match=r"has not been run; run beam\.") as caught:
        beam.sheet.close()
    assert len(caught.value.faults) >= 7


def test_the_same_inputs_again_change_nothing(floor: Record) -> None:
    """The cell of the inputs run again, nothing else: the record stands."""
    beam = start()
    run(beam)
    start(sheet=beam.sheet)
    assert beam.sheet.close().digest == floor.digest


@pytest.mark.parametrize(
    "changes",
    [
        {"superimposed": "2.4 kPa"},
        {"shear_method": "simplified"},
        {"carries": "floor, nothing attached that deflection damages"},
    ],
    ids=["load", "method", "carried"],
)
def test_a_changed_input_asks_for_every_chapter_again(changes: dict[str, Any]) -> None:
    """Also one that no line rests on: nothing made with the old inputs stands for the new ones."""
    beam = start()
    run(beam)
    again = start(sheet=beam.sheet, **changes)
    missing = {text.partition("run beam.")[2] for text in unclosed(again)}
    assert missing == {f"{call}()" for call in CALLS}
    run(again)
    assert again.sheet.close().digest == record_of(**changes).digest


@pytest.mark.parametrize(
    ("first", "then", "gone"),
    [
        ({}, {"spans": ["7.6 m", "9.2 m"],
              "supports": ["girder 400 mm", "column 450 mm", "girder 400 mm"]},
         ["span-3", "sag-3", "hog-4-left", "shear-3-left", "deflection-3"]),
        (TORSION, TORSION | {"torques": None, "closed_stirrups": False}, ["torsion"]),
        ({}, {"supports": ["free", "column 450 mm", "column 450 mm", "girder 400 mm"],
              "spans": ["2 m", "9.2 m", "7.6 m"]}, ["sag-1", "hog-1-right"]),
        ({"slab_bars": "2 x 10M at 300 mm"}, {"slab_bars": None}, []),
        ({"columns": {2: "450 mm x 450 mm x 3.6 m"}}, {}, ["columns"]),
        ({"shape": "rectangular", "h_f": None, "floor_weight": "3.4 kPa"}, {}, []),
    ],
    ids=["a span less", "no torsion", "cantilever", "slab bars", "no columns", "T"],
)  # fmt: skip
def test_parts_no_longer_made_are_forgotten(
    first: dict[str, Any], then: dict[str, Any], gone: list[str]
) -> None:
    """Other inputs on the same sheet, all cells run again: as if they had been the first."""
    beam = start(**first)
    run(beam)
    before = {part.key for part in beam.sheet.parts}
    again = start(sheet=beam.sheet, **then)
    run(again)
    after = {part.key for part in again.sheet.parts}
    for key in gone:
        assert any(k.startswith(key) for k in before), key
        assert not any(k.startswith(key) for k in after), key
    assert again.sheet.close().digest == record_of(**then).digest
