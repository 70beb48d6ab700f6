"""``lineproof review`` and the review that ``issue`` prints."""

from __future__ import annotations

import json
from dataclasses import replace
from pathlib import Path
from typing import Any

import pytest

from lineproof.audit.data import Severity
from lineproof.audit.review.data import Raised, Review, Reviewer, State
from lineproof.audit.review.marks import TO_CHECK, marked
from lineproof.audit.review.read import read_review
from lineproof.cli import main
from lineproof.notebook.read import read_calc
from lineproof.package import records_in_html
from lineproof.package.read import reviews_in_html
from lineproof.record import Record
from lineproof.sheet import Sheet

AT = "2026-12-01T15:05:33Z"
MORI, OTT = Reviewer("Kei Mori", "KM"), Reviewer("Ines Ott", "IO")


def beam(h: str = "600 mm", prepared: str = "A. Verdon") -> Record:
    project = {
        "codes": {"pair": "NBC 2015 + A23.3-14"},
        "issue": {"prepared_by": prepared, "date": "2026-12-01"},
    }
    sheet = Sheet("B1", "Beam", project=project)
    with sheet.part("data", "Data"):
        sheet.given("h", h, "depth")
    with sheet.part("flexure", "Flexure"):
        sheet.line("d = 0.9*h", unit="mm", title="Effective depth")
        sheet.check("d <= h", title="Depth within the section", key="within")
    return sheet.close()


def lines_of(record: Record) -> list[str]:
    return [line for line, entry in record.entries.items() if entry["kind"] in TO_CHECK]


def review_of(record: Record, who: Reviewer = MORI, state: State = State.ACCEPTED) -> Review:
    review = Review(record.calc_id, reviewers=(who,))
    return marked(review, record, lines_of(record), by=who.name, at=AT, state=state)


@pytest.fixture
def calc(tmp_path: Path) -> Path:
    path = tmp_path / "beam.json"
    path.write_text(beam().to_text(), encoding="utf-8")
    return path


def save(folder: Path, name: str, review: Review) -> Path:
    path = folder / name
    path.write_text(review.to_text(), encoding="utf-8")
    return path


def test_a_review_with_nothing_open_is_all_well(
    calc: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    save(calc.parent, "beam.review.json", review_of(beam()))
    assert main(["review", str(calc)]) == 0
    assert capsys.readouterr().out.splitlines() == [
        f"B1: record {beam().digest}, reviewed by Kei Mori (KM)",
        (
            "  3 lines to check; 3 accepted; 0 seen; 0 queried; 0 marked before a change; "
            "0 not marked."
        ),
    ]


def test_what_is_stale_names_its_cause(calc: Path, capsys: pytest.CaptureFixture[str]) -> None:
    save(calc.parent, "beam.review.json", review_of(beam()))
    calc.write_text(beam(h="650 mm").to_text(), encoding="utf-8")
    assert main(["review", str(calc)]) == 1
    out = capsys.readouterr().out
    assert "stale: Depth (1.1) was 600 mm, is 650 mm. 3 marks by KM: 1.1, 2.1, 2.2" in out


def test_what_is_open_is_listed(calc: Path, capsys: pytest.CaptureFixture[str]) -> None:
    review = marked(
        Review("B1", reviewers=(MORI,)), beam(), ["flexure/d"], by="Kei Mori", at=AT,
        state=State.QUERIED,
    )  # fmt: skip
    found = Raised(2, Severity.MAJOR, "Depth \x1b[31m?", "Kei Mori", AT, ("data/h",))
    save(calc.parent, "beam.review.json", replace(review, findings=(found,)))
    assert main(["review", str(calc)]) == 1
    out = capsys.readouterr().out
    assert "  not marked: 1.1, 2.2\n" in out
    assert "  queried: 2.1\n" in out
    assert "  finding 2, major, open: Depth <U+001B>[31m?\n" in out


def test_two_files_are_merged_and_the_conflict_is_told(
    calc: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    first = save(calc.parent, "km.json", review_of(beam()))
    second = save(calc.parent, "io.json", review_of(beam(), OTT, State.QUERIED))
    out = calc.parent / "beam.review.json"
    code = main(["review", str(calc), "--marks", str(first), str(second), "--merge", str(out)])
    assert code == 1
    told = capsys.readouterr().out
    assert told.startswith(f"{out}\n")
    assert (
        "  conflict: 2.1 Effective depth: arithmetic checked by Kei Mori, arithmetic queried by "
        "Ines Ott\n" in told
    )
    merged = read_review(out.read_text(encoding="utf-8"))
    assert {mark.by for mark in merged.marks} == {"Kei Mori", "Ines Ott"}
    assert len(merged.marks) == 6
    assert read_review(first.read_text(encoding="utf-8")).marks == review_of(beam()).marks


def test_merging_does_not_overwrite_a_file_that_it_has_not_read(
    calc: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    first = save(calc.parent, "km.json", review_of(beam()))
    other = save(calc.parent, "old.json", review_of(beam(), OTT))
    before = other.read_bytes()
    assert main(["review", str(calc), "--marks", str(first), "--merge", str(other)]) == 2
    assert "exists and would be lost; name it behind --marks too" in capsys.readouterr().err
    assert other.read_bytes() == before


def test_signing_off_writes_the_digest_of_the_record(
    calc: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    path = save(calc.parent, "beam.review.json", review_of(beam()))
    assert main(["review", str(calc), "--sign", "Kei Mori", "--on", "2026-12-02"]) == 0
    (signed,) = read_review(path.read_text(encoding="utf-8")).signed
    assert (signed.record, signed.by, signed.on) == (beam().digest, "Kei Mori", "2026-12-02")
    told = f"Signed off by Kei Mori on 2026-12-02 for the record {beam().digest}, which is this one"
    assert told in capsys.readouterr().out


def test_signing_off_while_something_is_open_changes_nothing(
    calc: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    path = save(calc.parent, "beam.review.json", review_of(beam(), state=State.QUERIED))
    before = path.read_bytes()
    assert main(["review", str(calc), "--sign", "Kei Mori", "--on", "2026-12-02"]) == 2
    assert "B1: not signed off: 3 lines queried: 1.1, 2.1, 2.2" in capsys.readouterr().err
    assert path.read_bytes() == before


def test_the_originator_is_refused(calc: Path, capsys: pytest.CaptureFixture[str]) -> None:
    save(calc.parent, "beam.review.json", review_of(beam(), Reviewer("A. Verdon", "AV")))
    assert main(["review", str(calc)]) == 2
    assert "A. Verdon prepared this calc (issue.prepared_by" in capsys.readouterr().err


@pytest.mark.parametrize(
    ("options", "told"),
    [
        ([], "no such file; open the HTML package in a browser, choose Review"),
        (["--marks", "cut.json"], "cut.json: review: not readable as JSON"),
        (["--marks", "cut.json", "none.json"], "none.json: no such file"),
        (["--marks", "latin.json"], "latin.json: not UTF-8 text"),
        (["--marks", "."], "cannot be read"),
        (["--marks", "other.json"], "holds B1, but the review is of calc 'B9'"),
        (["--marks", "a.json", "b.json", "--sign", "X"], "2 files of marks; say with --merge OUT"),
        (["--on", "2026-12-02"], "--on is the day of a sign-off"),
        (["--marks", "a.json", "--sign", " "], "--sign: no name; write who signs, as in --sign"),
        (["--marks", "a.json", "--sign", ""], "--sign: no name; write who signs, as in --sign"),
    ],
)
def test_wrong_input_gets_a_sentence(
    calc: Path,
    options: list[str],
    told: str,
    capsys: pytest.CaptureFixture[str],
    monkeypatch: pytest.MonkeyPatch,
) -> None:
    monkeypatch.chdir(calc.parent)
    Path("cut.json").write_text(review_of(beam()).to_text()[:300], encoding="utf-8")
    Path("latin.json").write_bytes(b"\xff\xfe\x00")
    save(calc.parent, "other.json", Review("B9"))
    files = sorted(calc.parent.iterdir())
    assert main(["review", calc.name, *options]) == 2
    assert told in capsys.readouterr().err
    assert sorted(calc.parent.iterdir()) == files


def test_a_review_file_may_stand_behind_the_calc(
    calc: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    path = save(calc.parent, "km.json", review_of(beam()))
    other = save(calc.parent, "io.json", review_of(beam(), OTT))
    assert main(["review", str(calc), str(path), str(other)]) == 0
    assert "reviewed by Ines Ott (IO), Kei Mori (KM)" in capsys.readouterr().out
    assert main(["review", str(path)]) == 2
    told = capsys.readouterr().err
    assert "km.json: is a review, not a calc; give the notebook, package or record" in told
    assert "'lineproof review CALC km.json'" in told


@pytest.mark.parametrize("ending", ["html", "pdf"])
def test_a_package_without_a_file_beside_it_gives_the_review_printed_in_it(
    beam_file: Path, ending: str, capsys: pytest.CaptureFixture[str]
) -> None:
    record = read_calc(beam_file).record
    save(beam_file.parent, "beam.review.json", review_of(record))
    assert main(["issue", str(beam_file)]) == 0
    package = beam_file.parent / "issued" / f"beam.{ending}"
    capsys.readouterr()
    assert main(["review", str(package)]) == 0
    assert f"B1: record {record.digest}, reviewed by Kei Mori (KM)" in capsys.readouterr().out
    save(package.parent, "beam.review.json", review_of(record, OTT))
    assert main(["review", str(package)]) == 0
    assert "reviewed by Ines Ott (IO)" in capsys.readouterr().out


def test_issue_prints_the_review_that_lies_beside_the_notebook(
    beam_file: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    record = read_calc(beam_file).record
    review = replace(
        review_of(record),
        findings=(Raised(1, Severity.MINOR, "Say which bars.", "Kei Mori", AT, ("data/A_s",)),),
    )
    save(beam_file.parent, "beam.review.json", review)
    assert main(["issue", str(beam_file)]) == 0
    page = (beam_file.parent / "issued" / "beam.html").read_text(encoding="utf-8")
    assert "finding 1, minor, open: Say which bars." in page
    assert [read_review(text) for text in reviews_in_html(page)] == [read_review(review.to_text())]
    (data,) = records_in_html(page)
    assert data["digest"] == record.digest
    assert main(["review", str(beam_file)]) == 1
    assert "finding 1, minor, open: Say which bars." in capsys.readouterr().out


@pytest.mark.parametrize(
    ("review", "told"),
    [
        (Review("B9"), "the review is of calc 'B9', not of 'B1'"),
        (None, "beam.review.json: review: not readable as JSON"),
    ],
)
def test_issue_refuses_a_review_that_is_damaged_or_of_another_calc(
    beam_file: Path, review: Review | None, told: str, capsys: pytest.CaptureFixture[str]
) -> None:
    text = review.to_text() if review is not None else "{"
    (beam_file.parent / "beam.review.json").write_text(text, encoding="utf-8")
    assert main(["issue", str(beam_file)]) == 2
    assert told in capsys.readouterr().err
    assert not (beam_file.parent / "issued").exists()


def test_the_review_is_the_same_file_whatever_wrote_it(calc: Path) -> None:
    """Merging one file with itself writes the bytes that were read."""
    path = save(calc.parent, "beam.review.json", review_of(beam()))
    before = path.read_bytes()
    main(["review", str(calc), "--merge", str(path)])
    assert path.read_bytes() == before
    data: dict[str, Any] = json.loads(before)
    assert len(data["marks"]) == 3
