"""Code pairs in a beam: a changed clause is named, an office's value is used, mixes are refused."""

from __future__ import annotations

from typing import Any

import pytest

from lineproof.errors import UserError

from .gallery import holds, number, record_of, start

NEW: dict[str, Any] = {"codes": {"pair": "NBC 2020 + A23.3:19"}}


def confirmed(**row: Any) -> dict[str, Any]:
    """Return the project with one confirmed value of 10.5.2."""
    basis = {"clause": "10.5.2", "edition": "CSA A23.3:19", "value": 0.5, "by": "A.B.",
             "on": "2026-11-20"}  # fmt: skip
    return NEW | {"confirmed": [basis | row]}


def rows_to_confirm(record: Any, clause: str) -> list[dict[str, Any]]:
    """Return the rows of the list to be confirmed that name the clause."""
    return [row for row in record.data["confirm"] if row["clause"] == clause]


def test_pair_of_2015_has_nothing_changed() -> None:
    """The rule of A23.3-14 itself: 700/1100 = 0.636; from memory, so on the list to confirm."""
    record = record_of()
    assert number(record, "flexure/c_d") == pytest.approx(7 / 11)
    assert record.entries["flexure/c_d"]["kind"] == "line"
    assert "materials/changed-10-5-2" not in record.entries
    assert all("changed" not in row["basis"] for row in record.data["confirm"])


def test_changed_clause_is_named_and_the_old_rule_used() -> None:
    """NBC 2020 with A23.3:19: a note, a row to confirm, 0.636 until the office has a value."""
    record = record_of(project=NEW)
    note = record.entries["materials/changed-10-5-2"]
    assert note["text"] == (
        "Clause 10.5.2: limit of c/d: changed since A23.3-14. Its text in CSA A23.3:19 is not "
        "known here: the rule known before is used until the office confirms this one in its own "
        "copy."
    )
    assert number(record, "flexure/c_d") == pytest.approx(7 / 11)
    changed = [r for r in rows_to_confirm(record, "10.5.2") if "CSA A23.3:19" in r["basis"]]
    assert len(changed) == 1
    assert changed[0]["confirmed"] == ""
    assert changed[0]["lines"][0] == "materials/changed-10-5-2"
    assert "flexure/c_d" in changed[0]["lines"]
    assert record.data["codes"] == {
        "pair": "NBC 2020 + A23.3:19", "building": "NBC 2020", "concrete": "CSA A23.3:19",
    }  # fmt: skip


def test_newest_pair_names_every_clause_not_seen() -> None:
    """NBC 2025 + A23.3:24: ductility, load cases, live loads, stress block; each to be confirmed.

    NBC clauses are those of the building code, the others those of the concrete standard.
    """
    record = record_of(project={"codes": {"pair": "NBC 2025 + A23.3:24"}})
    codes = {
        "10.5.2": "CSA A23.3:24", "10.1.7": "CSA A23.3:24", "NBC 4.1.3.2": "NBC 2025",
        "NBC 4.1.5.3": "NBC 2025",
    }  # fmt: skip
    for clause, code in codes.items():
        key = f"materials/changed-{clause.replace('.', '-').replace(' ', '-')}"
        assert f"Its text in {code} is not known here" in record.entries[key]["text"]
        (row,) = [r for r in rows_to_confirm(record, clause) if key in r["lines"]]
        assert (row["confirmed"], code in row["basis"]) == ("", True)
    notes = {i for i in record.entries if i.startswith("materials/changed-")}
    assert len(notes) == len(codes)


def test_rows_to_confirm_are_one_per_clause_and_basis() -> None:
    """No row twice; the fire tables, from memory in part, are on the list."""
    rows = [(r["clause"], r["basis"]) for r in record_of().data["confirm"]]
    assert len(rows) == len(set(rows))
    assert any(clause.startswith("NBC D-2") for clause, _ in rows)


def test_confirmed_value_is_used() -> None:
    """The office's 0.5 in place of 0.636, with who and when; at midspan and at the ends."""
    record = record_of(project=confirmed())
    for part in ("flexure", "top-steel"):
        entry = record.entries[f"{part}/c_d"]
        assert (entry["kind"], entry["value"]) == ("given", 0.5)
        assert entry["source"] == "CSA A23.3:19, 10.5.2, confirmed by A.B., 2026-11-20"
        assert record.entries[f"{part}/yield"]["right"] == 0.5
    rows = rows_to_confirm(record, "10.5.2")
    assert {row["confirmed"] for row in rows} == {"A.B., 2026-11-20"}
    assert (
        "the value that the office confirmed" in record.entries["materials/changed-10-5-2"]["text"]
    )


def test_confirmed_value_rules_the_bars() -> None:
    """A tight limit fails bars that the old rule passes: c/d = 14.77/566.1 = 0.0261."""
    tight = record_of(project=confirmed(value=0.02), bottom_bars="4-25M", ends="free")
    assert not holds(tight, "flexure/yield")
    assert tight.failed == ["flexure/yield"]
    wide = record_of(project=confirmed(value=0.03), bottom_bars="4-25M", ends="free")
    assert wide.failed == []


@pytest.mark.parametrize(
    "row", [{"edition": "CSA A23.3:24"}, {"clause": "10.1.7"}, {"edition": None}]
)
def test_a_value_for_another_edition_or_clause_is_not_taken(row: dict[str, Any]) -> None:
    """Only the very clause of the very edition counts."""
    record = record_of(project=confirmed(**row))
    assert number(record, "flexure/c_d") == pytest.approx(7 / 11)


def test_an_edition_that_did_not_change_the_clause_keeps_its_rule() -> None:
    """A row for A23.3:19 does not touch a calculation to A23.3-14."""
    project = confirmed() | {"codes": {"pair": "NBC 2015 + A23.3-14"}}
    assert number(record_of(project=project), "flexure/c_d") == pytest.approx(7 / 11)


@pytest.mark.parametrize("value", [5, 0, -0.5, "half", None, 1])
def test_a_value_that_is_no_ratio_is_refused(value: object) -> None:
    """c/d lies between 0 and 1."""
    with pytest.raises(UserError, match=r"of clause 10\.5\.2 is not a ratio c/d between 0 and 1"):
        record_of(project=confirmed(value=value))


@pytest.mark.parametrize("pair", ["NBC 2015 + A23.3:19", "NBC 2020 + A23.3-14", "NBC 2020", ""])
def test_mixes_are_refused(pair: str) -> None:
    """The pairs are locked."""
    with pytest.raises(
        UserError, match=r"^codes\.pair: .* is not a locked code pair; write one of"
    ):
        start(project={"codes": {"pair": pair}})


def test_digest_depends_on_the_pair() -> None:
    """The same numbers to another code are another calculation."""
    assert record_of().digest != record_of(project=NEW).digest
