"""``lineproof compare``: two issues of one calc."""

from __future__ import annotations

from pathlib import Path
from typing import Any

import pytest

from lineproof import Sheet
from lineproof.cli import main
from lineproof.record import Record

Capture = pytest.CaptureFixture[str]


def record(
    calc: str = "B7", *, moment: str, use: str = "office", letter: str = "A", issue: str = ""
) -> Record:
    """A check of a moment against 60 kN x 2 m = 120 kN.m."""
    revisions = [{"letter": letter, "date": "2026-12-01", "description": "issued"}]
    sheet = Sheet(calc, project={"revisions": revisions, "issue": {"revision": issue}})
    with sheet.part("given", "Given"):
        sheet.given("M", moment, "moment")
        sheet.given("P", "60 kN", "force")
        sheet.given("a", "2 m", "arm")
        sheet.note("choices", f"Section T; use: {use}; exposure class N.")
    with sheet.part("strength", "Strength"):
        sheet.line("M_s = P*a", unit="kN.m", title="Resistance")
        sheet.check("M <= M_s", key="moment", title="Moment")
    return sheet.close()


@pytest.fixture
def issues(tmp_path: Path) -> tuple[str, str]:
    """Revision A, and B with a larger moment and another use."""
    made: dict[str, Any] = {
        "a": record(moment="110 kN.m"),
        "b": record(moment="130 kN.m", use="garage", letter="B"),
    }
    for name, each in made.items():
        (tmp_path / f"{name}.json").write_text(each.to_text(), encoding="utf-8")
    return str(tmp_path / "a.json"), str(tmp_path / "b.json")


def test_what_changed_is_told_with_both_values(issues: tuple[str, str], capsys: Capture) -> None:
    """110/120 = 0.92 holds, 130/120 = 1.08 does not; force and arm are as they were."""
    assert main(["compare", *issues]) == 1
    told = capsys.readouterr().out.splitlines()
    assert "B7 revision A" in told[0]
    assert "to B7 revision B" in told[0]
    assert told[0].endswith(": 3 lines changed, 0 lines new, 0 lines gone")
    assert told[1:] == [
        "  Checks with another verdict:",
        "    2.2 strength/moment (Moment): was: holds, ratio 0.92; is: does not hold, ratio 1.08",
        "  Inputs, choices and notes:",
        "    1.1 given/M (moment): was: 110 kN.m; is: 130 kN.m",
        "    given/choices: was: 'use: office;'; is: 'use: garage;'",
    ]


def test_two_issues_of_one_letter_are_told_apart(tmp_path: Path, capsys: Capture) -> None:
    """Both say revision A, of 110 and of 115 kN.m: on paper nobody could tell which is which."""
    for moment in ("110 kN.m", "115 kN.m"):
        text = record(moment=moment).to_text()
        (tmp_path / f"{moment[:3]}.json").write_text(text, encoding="utf-8")
    assert main(["compare", str(tmp_path / "110.json"), str(tmp_path / "115.json")]) == 1
    told = capsys.readouterr().out.splitlines()
    assert told[1] == "  Both carry revision A: give the new issue its own in project.toml."


def test_the_revision_is_the_one_that_the_cover_names(tmp_path: Path, capsys: Capture) -> None:
    """project.toml may name the revision of the issue itself; the list below it is the history."""
    for name, issue in (("a", ""), ("c", "C")):
        text = record(moment="110 kN.m" if name == "a" else "115 kN.m", issue=issue).to_text()
        (tmp_path / f"{name}.json").write_text(text, encoding="utf-8")
    assert main(["compare", str(tmp_path / "a.json"), str(tmp_path / "c.json")]) == 1
    told = capsys.readouterr().out
    assert "to B7 revision C" in told
    assert "Both carry" not in told


def test_the_same_calculation_is_called_so(issues: tuple[str, str], capsys: Capture) -> None:
    assert main(["compare", issues[0], issues[0]]) == 0
    assert capsys.readouterr().out.endswith(": the same calculation, 6 lines\n")


def test_all_names_every_line_in_order(issues: tuple[str, str], capsys: Capture) -> None:
    main(["compare", *issues, "--all"])
    told = capsys.readouterr().out
    assert "  Lines:\n" in told
    assert told.index("given/M") < told.index("given/choices") < told.rindex("strength/")


def test_another_calc_is_refused(issues: tuple[str, str], tmp_path: Path, capsys: Capture) -> None:
    other = tmp_path / "c.json"
    other.write_text(record("B12", moment="110 kN.m").to_text(), encoding="utf-8")
    assert main(["compare", issues[0], str(other)]) == 2
    assert "give two issues of the same calc" in capsys.readouterr().err
