"""Parts: running cells again in any order, names, and what is out of date."""

from __future__ import annotations

from collections.abc import Iterator

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from lineproof.errors import UserError
from lineproof.formula import criterion
from lineproof.record import Record, procedure, recompute
from lineproof.sheet import PartView, Sheet, Trial


@procedure("half of a length", 1, "Half", ("h",))
def half(h: float) -> float:
    """Return half of it."""
    return h / 2


def run_inputs(sheet: Sheet, h: str = "600 mm") -> None:
    with sheet.part("inputs", "Inputs"):
        sheet.given("h", h)
        sheet.given("b", "300 mm")


def run_area(sheet: Sheet) -> None:
    with sheet.part("area", "Area"):
        sheet.line("A = b*h", unit="mm2")


def run_load(sheet: Sheet) -> None:
    with sheet.part("load", "Load"):
        sheet.given("gamma", "24 kN/m3")
        sheet.line("w = gamma*A", unit="kN/m")


def run_apart(sheet: Sheet) -> None:
    with sheet.part("apart", "Rests on nothing"):
        sheet.given("q", "4.8 kPa")


RUNS = {"inputs": run_inputs, "area": run_area, "load": run_load, "apart": run_apart}


@pytest.fixture
def sheet() -> Sheet:
    made = Sheet("B1")
    for run in RUNS.values():
        run(made)
    return made


def test_ids_and_labels(sheet: Sheet) -> None:
    record = sheet.close()
    assert [(i, e["label"]) for i, e in record.entries.items()] == [
        ("inputs/h", "1.1"), ("inputs/b", "1.2"), ("area/A", "2.1"), ("load/gamma", "3.1"),
        ("load/w", "3.2"), ("apart/q", "4.1"),
    ]  # fmt: skip
    # 0.3 x 0.6 x 24 = 4.32 kN/m
    assert record.entries["load/w"]["value"] == pytest.approx(4.32, rel=1e-12)


@settings(max_examples=40, deadline=None)
@given(st.lists(st.sampled_from(sorted(RUNS)), max_size=8))
def test_cells_run_again_in_any_order_change_nothing(order: list[str]) -> None:
    sheet = Sheet("B1")
    for run in RUNS.values():
        run(sheet)
    before = sheet.close()
    for key in order:
        RUNS[key](sheet)
    assert sheet.close().data == before.data


@settings(max_examples=40, deadline=None)
@given(st.lists(st.sampled_from(sorted(RUNS)), max_size=8))
def test_cells_run_too_early_and_again_give_the_same_record(order: list[str]) -> None:
    sheet = Sheet("B1")
    for key in order:
        try:
            RUNS[key](sheet)
        except UserError as error:
            assert "is not recorded" in str(error)  # noqa: PT017 - a cell run too early
    for run in RUNS.values():
        run(sheet)
    record = Record.from_text(sheet.close().to_text())  # what rests on something stands behind it
    assert recompute(record) == []
    assert sorted(record.entries) == sorted(
        ["inputs/h", "inputs/b", "area/A", "load/gamma", "load/w", "apart/q"]
    )


def test_a_changed_part_names_all_that_must_run_again(sheet: Sheet) -> None:
    sheet.expected = {"area": "beam.area()"}
    run_inputs(sheet, "650 mm")
    with pytest.raises(UserError) as caught:
        sheet.close()
    assert caught.value.faults == (
        "B1: part 'area' rests on inputs/h, which has changed since; run beam.area() again",
        "B1: part 'load' rests on area/A, which has changed since; run it again",
    )
    run_area(sheet)
    with pytest.raises(UserError, match=r"^B1: part 'load' rests on area/A, which has changed"):
        sheet.close()
    run_load(sheet)
    assert sheet.close().entries["load/w"]["value"] == pytest.approx(0.3 * 0.65 * 24)


def test_an_entry_that_is_gone_makes_its_users_out_of_date(sheet: Sheet) -> None:
    with sheet.part("inputs", "Inputs"):
        sheet.given("b", "300 mm")
    with pytest.raises(UserError, match="part 'area' rests on inputs/h"):
        sheet.close()


def test_a_closing_criterion_is_out_of_date_too() -> None:
    sheet = Sheet("B1")
    run_inputs(sheet)
    with sheet.part("limit", "Limit"):
        sheet.given("most", "400 mm")
    with sheet.part("found", "Found"):
        sheet.found("x", half, criterion("x <= most", unit="mm"), unit="mm")
    sheet.close()
    with sheet.part("limit", "Limit"):
        sheet.given("most", "100 mm")
    with pytest.raises(UserError, match="part 'found' rests on limit/most"):
        sheet.close()


def test_a_part_that_stopped_is_refused_until_it_has_run(sheet: Sheet) -> None:
    def stop() -> None:
        with sheet.part("apart", "Rests on nothing"):
            sheet.given("q", "4.8 kPa")
            raise RuntimeError

    with pytest.raises(RuntimeError):
        stop()
    with pytest.raises(UserError) as caught:
        sheet.close()
    assert str(caught.value) == (
        "B1: part 'apart' (Rests on nothing) stopped with an error; run it again"
    )
    run_apart(sheet)
    assert sheet.close()


def test_a_part_not_run_is_named_with_its_call(sheet: Sheet) -> None:
    sheet.expected = {"flexure": "beam.flexure()", "area": "beam.area()"}
    with pytest.raises(UserError) as caught:
        sheet.close()
    assert caught.value.faults == ("B1: part 'flexure' has not been run; run beam.flexure()",)
    with pytest.raises(UserError, match=r"run beam.flexure\(\) first"):
        sheet.entry("flexure/M_r")
    with pytest.raises(UserError, match=r"x is not recorded \(not run yet: beam.flexure\(\)\)"), \
            sheet.part("p", "P"):  # fmt: skip
        sheet.line("y = x", unit="mm")


def test_parts_that_rest_on_each_other_are_refused(sheet: Sheet) -> None:
    with sheet.part("inputs", "Inputs"):
        sheet.given("h", "600 mm")
        sheet.given("b", "300 mm")
        sheet.line("t = A/b", unit="mm")
    with pytest.raises(UserError, match="rest on each other"):
        sheet.close()


def test_a_chain_of_thousands_of_lines(sheet: Sheet) -> None:
    def run(key: str, first: str) -> None:
        with sheet.part(key, "Long"):
            sheet.line(f"x0 = {first}", unit="mm")
            for n in range(2000):
                sheet.line(f"x{n + 1} = x{n}/1", unit="mm")

    run("long", "h")
    digest = sheet.entry("long/x2000").digest
    record = sheet.close()
    assert record.entries["long/x2000"]["digest"] == digest
    with sheet.part("end", "End"):
        sheet.line("y = x2000", unit="mm")
    run_inputs(sheet, "700 mm")
    with pytest.raises(UserError, match="part 'end' rests on long/x2000"):
        sheet.close()


def test_names_that_stand_twice_say_which(sheet: Sheet) -> None:
    with sheet.part("web", "Web"):
        sheet.given("h", "500 mm")
        own = sheet.line("z = h/2", unit="mm")  # its own h comes first
    assert own.args[0].id == "web/h"
    with pytest.raises(UserError) as caught, sheet.part("p", "P"):
        sheet.line("z = h/2", unit="mm")
    assert str(caught.value) == "h stands in inputs/h, web/h; say which: h=sheet.entry('inputs/h')"
    with sheet.part("p", "P"):
        bound = sheet.line("z = h/2", unit="mm", h=sheet.entry("web/h"))
        test = sheet.decide("h <= z", h=sheet.entry("inputs/h"))
    assert bound.args[0].id == "web/h"
    assert not test


def test_an_own_name_takes_over_from_one_outside(sheet: Sheet) -> None:
    with sheet.part("p", "P"):
        outside = sheet.line("x = b*2", unit="mm")
        sheet.given("b", "1 m")
        inside = sheet.line("y = b*2", unit="mm")
    assert (outside.args[0].id, inside.args[0].id) == ("inputs/b", "p/b")


@pytest.mark.parametrize("key", ["", "a b", "-a", "a/b", "é", "a\n", "a" * 61, "../x"])
def test_keys(sheet: Sheet, key: str) -> None:
    with pytest.raises(UserError, match=r"^key .*use letters, digits and hyphens"), \
            sheet.part(key, "T"):  # fmt: skip
        pass


def test_places_where_nothing_can_be_recorded(sheet: Sheet) -> None:
    with pytest.raises(UserError, match="nothing can be recorded outside a part"):
        sheet.given("x", "1 mm")
    with pytest.raises(UserError, match="nothing can be recorded outside a part"):
        sheet.line("x = b", unit="mm")
    with pytest.raises(UserError, match="opened inside part 'p'"), sheet.part("p", "P"), \
            sheet.part("q", "Q"):  # fmt: skip
        pass
    with sheet.part("p", "P"):
        sheet.given("x", "1 mm")
        with pytest.raises(UserError, match="x stands twice in part 'p'"):
            sheet.line("x = b", unit="mm")
    with pytest.raises(UserError, match="'nowhere' is not recorded"):
        sheet.entry("nowhere")


@pytest.fixture
def shown() -> Iterator[list[str]]:
    seen: list[str] = []

    def show(view: PartView) -> None:
        seen.append(view.key)

    before, Sheet.shown = Sheet.shown, show
    yield seen
    Sheet.shown = before


def test_a_closed_part_is_shown(shown: list[str]) -> None:
    sheet = Sheet("B1")
    run_inputs(sheet)
    with pytest.raises(ZeroDivisionError), sheet.part("p", "P"):
        raise ZeroDivisionError
    assert shown == ["inputs"]


def test_a_trial_leaves_the_sheet_alone(sheet: Sheet, shown: list[str]) -> None:
    before = sheet.close().data
    trial = Trial(sheet)
    run_inputs(trial, "700 mm")
    run_area(trial)
    with trial.part("more", "More"):
        assert trial.line("x = A/b", unit="mm").value == pytest.approx(700.0)
    assert trial.find("A").value == pytest.approx(210_000.0)  # 300 x 700
    assert sheet.find("A").value == pytest.approx(180_000.0)  # 300 x 600
    assert shown == []
    assert sheet.close().data == before


def test_entries_of_a_part(sheet: Sheet) -> None:
    sheet.expected = {"flexure": "beam.flexure()"}
    assert list(sheet.entries_of("load")) == ["gamma", "w"]
    with pytest.raises(UserError, match=r"^part 'flexure' is not recorded; run beam.flexure\(\)"):
        sheet.entries_of("flexure")
    with sheet.part("p", "P"):
        own = sheet.given("h", "500 mm")
        assert sheet.find("h") is own
    with pytest.raises(UserError, match="h stands in inputs/h, p/h"):
        sheet.find("h")


def test_a_part_made_again_stands_for_the_new_value_alone() -> None:
    sheet = Sheet("B1")
    for value in ("400 mm", "450 mm"):
        with sheet.part("given", "Given"):
            sheet.given("b", value)
        with sheet.part("lines", "Lines"):
            made = sheet.line("b_2 = 2*b", unit="mm")
        assert made.value == 2 * float(value.split()[0])


def test_a_part_no_longer_expected_gives_no_value() -> None:
    sheet = Sheet("B1")
    sheet.expect({"given": "beam.given()"})
    with sheet.part("given", "Given"):
        sheet.given("b", "400 mm")
    sheet.expect({})
    with (
        pytest.raises(UserError, match="b is not recorded"),
        sheet.part("lines", "Lines"),
    ):
        sheet.line("b_2 = 2*b", unit="mm")
