"""The validation as a calculation: every published case is recorded, agrees, and can be redone."""

from __future__ import annotations

import statistics

import pytest

from lineproof.beams import validation_study
from lineproof.beams.validation import data
from lineproof.beams.validation.case_steps import AGREES, CaseSteps, agreement, recorded
from lineproof.beams.validation.flexure_cases import FLEXURE_CASES
from lineproof.beams.validation.frame_cases import FRAME_CASES
from lineproof.beams.validation.notation import OWN, notation_for
from lineproof.beams.validation.results import BENDING
from lineproof.beams.validation.section_cases import FORMULAS, SECTION_CASES
from lineproof.beams.validation.strength_tests import BENDING_TESTS, SHEAR_TESTS, WITH, WITHOUT
from lineproof.errors import UserError
from lineproof.formula.proof import prove, prove_criterion
from lineproof.record import Record
from lineproof.record.recompute import recompute
from lineproof.sheet import Sheet
from lineproof.standards.a23_3 import flexure
from lineproof.standards.catalogue import NOTATION

PROJECT = {"codes": {"pair": "NBC 2015 + A23.3-14"}}
AGREED = (*FLEXURE_CASES, *SECTION_CASES, *FRAME_CASES)


@pytest.fixture(scope="module")
def record() -> Record:
    study = validation_study(Sheet("V1", project=PROJECT))
    for call in ("flexure", "sections", "frames", "agreement", "shear_tests", "bending_tests"):
        getattr(study, call)()
    study.tests()
    return study.sheet.close()


def test_every_case_has_its_place() -> None:
    """Thirty-seven cases: those that must agree, twelve beams in shear, three pairs in bending."""
    named = (*AGREED, *SHEAR_TESTS, *BENDING_TESTS)
    assert sorted(named) == sorted(data.cases())
    assert (len(named), len(SHEAR_TESTS), len(BENDING_TESTS)) == (37, 12, 3)


def test_every_published_value_is_compared(record: Record) -> None:
    """Of the cases that must agree; a test to failure has no check of agreement."""
    made = {e["id"] for e in record.entries.values() if f"/{AGREES}" in e["id"]}
    wanted = {
        f"{data.cases()[name].key}/{AGREES}{symbol.replace('_', '-')}"
        for name in AGREED
        for symbol in data.cases()[name].published
    }
    assert made == wanted
    table = record.entries["agreement/agreement"]["rows"]
    assert len(table) == len(wanted)


def test_every_prediction_agrees(record: Record) -> None:
    """Published values stand in the data file with their sources; a test compares nothing else."""
    assert record.data["status"]["failed"] == []


def test_the_record_follows_from_its_givens(record: Record) -> None:
    assert recompute(record) == []


def test_a_prediction_is_a_step_and_a_published_value_a_given(record: Record) -> None:
    for name in AGREED:
        case = data.cases()[name]
        for symbol, published in case.published.items():
            predicted = record.entries[f"{case.key}/{symbol}"]
            assert predicted["kind"] in ("line", "found", "lookup"), predicted["id"]
            given = record.entries[f"{case.key}/{symbol}_pub"]
            assert (given["kind"], given["typed"]) == ("given", published.printed)
            assert given["source"] == case.short


def test_mean_and_scatter(record: Record) -> None:
    """Mean and sample standard deviation over the mean, by the standard library."""
    ratios = {
        name: record.entries[f"case-g2-{name.lower()}/r_{name}"]["value"] for name in WITHOUT + WITH
    } | {name: record.entries[f"case-c4-{name[1]}/r_{name}"]["value"] for name in BENDING}
    for group, names in (("all", WITHOUT + WITH), ("pl", WITHOUT), ("st", WITH), ("M", BENDING)):
        values = [ratios[name] for name in names]
        mean = statistics.mean(values)
        assert record.entries[f"tests/m_{group}"]["value"] == pytest.approx(mean, rel=1e-12)
        scatter = statistics.stdev(values) / mean
        assert record.entries[f"tests/v_{group}"]["value"] == pytest.approx(scatter, rel=1e-12)


def test_what_is_from_memory_is_said(record: Record) -> None:
    """In the table, in the note of the case, and for the beams in shear in the title."""
    rows = record.entries["agreement/agreement"]["rows"]
    basis = {row[0]: row[-1] for row in rows}
    recalled = {name for name in AGREED if data.cases()[name].basis == "from memory"}
    assert recalled == {"A4", "B1", "B2", "C1", "J2"}
    assert {name for name, said in basis.items() if said == "from memory"} == recalled
    for case in data.cases().values():
        assert case.basis in data.BASES
        assert case.basis in record.entries[f"{case.key}/source"]["text"]
    assert "from memory" in record.entries["tests/shear-tests"]["title"]


@pytest.mark.parametrize(("factor", "holds"), [(1.0, True), (1.0148, True), (1.0149, False)])
def test_an_agreement_can_fail(factor: float, *, holds: bool) -> None:
    """Published 209 kN.m within 3.1: 212.1 agrees, 212.114 does not."""
    published = data.cases()["A1"].published["M_r"]
    check = agreement("M_r", published, "kN.m")
    sides = (side(factor * 209e6, 209e6) for side in check.functions)
    assert check.holds(*sides) is holds


def test_half_a_unit_of_the_last_digit() -> None:
    """3.48: 0.005; 1.0: 0.05; 2.3e9: 0.05e9."""
    for printed, tolerance in (("3.48", 0.005), ("1.0", 0.05), ("2.3e9", 0.05e9), ("16", 0.5)):
        assert float(data.half_unit(printed)) == pytest.approx(tolerance, rel=1e-12)


def test_every_wider_tolerance_has_its_reason() -> None:
    for case in data.cases().values():
        for published in case.published.values():
            assert published.why
            half = data.half_unit(published.number)
            wide = float(published.within.split()[0]) > float(half) * (1 + 1e-9)
            assert (published.why != data.HALF_UNIT) or not wide


def test_symbols_are_not_those_of_the_catalogue() -> None:
    assert not set(OWN) & set(NOTATION)


def test_units_are_proved() -> None:
    """Of the formula of another code, and of every check of agreement."""
    symbols = frozenset(s for case in data.cases().values() for s in case.published)
    known = notation_for(symbols)
    for made in FORMULAS:
        prove(made, {name: known[name].unit for name in made.names})
    for name in AGREED:
        for symbol, published in data.cases()[name].published.items():
            check = agreement(symbol, published, known[symbol].unit)
            prove_criterion(check, {n: known[n].unit for n in check.names})
            assert set(check.names) == {symbol, f"{symbol}_pub"}


def test_a_case_takes_nothing_from_another() -> None:
    """A symbol that another case holds is no argument here."""
    sheet = Sheet("V1", project=PROJECT, notation=notation_for(frozenset()))
    with sheet.part("other", "Another case"):
        sheet.given("a", "100 mm")
    with recorded(sheet, data.cases()["A1"]) as steps:
        assert isinstance(steps, CaseSteps)
        with pytest.raises(KeyError, match="a, beta_1 not recorded in this case"):
            steps.line(flexure.NEUTRAL_AXIS)


def test_factors_that_are_none() -> None:
    with pytest.raises(UserError) as caught:
        validation_study(Sheet("V1", project=PROJECT), phi_c="0", phi_s="1.2")
    assert caught.value.faults == (
        "phi_c: '0' is no resistance factor; write '1.0' or less",
        "phi_s: '1.2' is no resistance factor; write '1.0' or less",
    )


def test_without_a_call_the_sheet_does_not_close() -> None:
    study = validation_study(Sheet("V1", project=PROJECT))
    study.flexure()
    with pytest.raises(UserError) as caught:
        study.sheet.close()
    assert any("study.shear_tests()" in fault for fault in caught.value.faults)
