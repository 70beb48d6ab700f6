"""Cells in any order and again: the same lines, or a refusal that says what to run."""

from __future__ import annotations

from collections.abc import Iterable

import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from lineproof.beams import FloorBeam
from lineproof.errors import UserError
from lineproof.record import Record

from .gallery import CALLS, RECTANGULAR, record_of, run, start

orders = settings(
    max_examples=25, deadline=None, derandomize=True, database=None,
    suppress_health_check=list(HealthCheck),
)  # fmt: skip


@pytest.fixture(scope="module")
def straight() -> Record:
    """The record of the calls made once in their order."""
    return record_of()


@st.composite
def call_orders(draw: st.DrawFn) -> list[str]:
    """Draw all calls in any order, some of them again."""
    again = draw(st.lists(st.sampled_from(CALLS), max_size=8))
    return draw(st.permutations([*CALLS, *again]))


@orders
@given(calls=call_orders())
def test_any_order(straight: Record, calls: list[str]) -> None:
    """A call too early says which call to run first; closing gives the same lines or refuses."""
    beam = start()
    assert all("run beam." in refusal for refusal in refusals(beam, calls))
    try:
        record = beam.sheet.close()
    except UserError as error:
        faults = error.faults
    else:
        assert record.digest == straight.digest
        return
    assert all("run " in fault for fault in faults)


def refusals(beam: FloorBeam, calls: Iterable[str]) -> list[str]:
    """Make the calls one after the other; return what those too early said."""
    said = []
    for call in calls:
        try:
            getattr(beam, call)()
        except UserError as error:
            said.append(str(error))
    return said


@orders
@given(calls=call_orders())
def test_any_order_then_straight(straight: Record, calls: list[str]) -> None:
    """After the cells have been run in order once more, nothing is left of the disorder."""
    beam = start()
    assert all("run beam." in refusal for refusal in refusals(beam, calls))
    run(beam)
    assert beam.sheet.close().digest == straight.digest


@orders
@given(extra=st.lists(st.integers(0, len(CALLS) - 1), max_size=10))
def test_straight_order_with_repeats(straight: Record, extra: list[int]) -> None:
    """Cells run again after the straight order change nothing."""
    beam = start()
    run(beam, CALLS)
    run(beam, [CALLS[i] for i in extra])
    assert beam.sheet.close().digest == straight.digest


@pytest.mark.parametrize("call", CALLS)
def test_a_call_alone(call: str) -> None:
    """Alone after the inputs it works or names what to run; closing names all that is missing."""
    beam = start()
    assert all("run beam." in refusal for refusal in refusals(beam, [call]))
    with pytest.raises(UserError, match=r"has not been run; run beam\.") as caught:
        beam.sheet.close()
    assert len(caught.value.faults) >= 3


def test_inputs_changed_between_two_runs() -> None:
    """A changed span makes what rests on it out of date, until its cells are run again."""
    beam = start()
    run(beam)
    again = start(sheet=beam.sheet, span="7 m")
    with pytest.raises(UserError, match=r"which has changed since; run beam\.loads\(\) again"):
        again.sheet.close()
    run(again)
    assert again.sheet.close().digest == record_of(span="7 m").digest


def test_the_same_inputs_again_change_nothing(straight: Record) -> None:
    """The cell of the inputs run again, nothing else: the record stands."""
    beam = start()
    run(beam)
    start(sheet=beam.sheet)
    assert beam.sheet.close().digest == straight.digest


def test_shape_changed_on_the_same_sheet() -> None:
    """From a tee to a rectangle, all cells run again: the record of a rectangle."""
    beam = start()
    run(beam)
    again = start(sheet=beam.sheet, **RECTANGULAR)
    run(again)
    assert again.sheet.close().digest == record_of(**RECTANGULAR).digest


def test_parts_no_longer_expected_are_forgotten() -> None:
    """Compression bars left out again: their part is gone, and the beam is as if never had."""
    beam = start(**RECTANGULAR, bottom_bars="4-25M / 4-25M", compression_bars="3-20M")
    run(beam)
    assert "compression-bars" in {part.key for part in beam.sheet.parts}
    again = start(sheet=beam.sheet, **RECTANGULAR, bottom_bars="4-25M / 4-25M")
    assert "compression-bars" not in {part.key for part in again.sheet.parts}
    run(again)
    straight = record_of(**RECTANGULAR, bottom_bars="4-25M / 4-25M")
    assert again.sheet.close().digest == straight.digest


def test_a_part_of_ones_own_takes_no_symbol_of_the_calculation() -> None:
    """A second A_s would stand for the bars; another symbol may be added."""
    sheet = run(start())

    def own(symbol: str) -> None:
        with sheet.part("own", "Of one's own"):
            sheet.given(symbol, "1200 mm2", "area of other bars")

    with pytest.raises(UserError, match="A_s stands in bars/A_s already; give your own value"):
        own("A_s")
    own("A_other")
    assert sheet.close().entries["own/A_other"]["value"] == 1200
