"""The project's file: what it gives a sheet, and what is refused with a sentence."""

from __future__ import annotations

from pathlib import Path

import pytest

from lineproof.errors import UserError
from lineproof.sheet import Sheet


def test_the_project_file(tmp_path: Path) -> None:
    path = tmp_path / "project.toml"
    path.write_text(
        '[codes]\npair = "NBC 2015 + A23.3-14"\n[project]\nname = [1]\n[issue]\ndate = 2026-11-20\n'
    )
    sheet = Sheet.open("B1", project=path, title="T")
    assert sheet.project == {
        "codes": {"pair": "NBC 2015 + A23.3-14"}, "project": {"name": [1]},
        "issue": {"date": "2026-11-20"},
    }  # fmt: skip
    assert sheet.calc == {"id": "B1", "title": "T"}


def test_a_project_file_that_is_not_there_is_told_with_what_to_do(tmp_path: Path) -> None:
    """As of a calc that was copied without it, or a name mistyped."""
    with pytest.raises(UserError) as caught:
        Sheet.open("B1", project=tmp_path / "projct.toml", title="T")
    assert str(caught.value) == (
        f"{tmp_path / 'projct.toml'}: no such file; copy the project.toml of the project beside "
        "the calc, or write its name"
    )


@pytest.mark.parametrize(
    ("content", "sentence"),
    [
        (b"x = ", "not valid TOML"),
        (b"\xff\xfe", "cannot be read (not UTF-8 text)"),
        (
            b"[building]\nimportance = 'medium'",
            "'medium' is no importance category; write 'low', 'normal', 'high' or 'post-disaster'",
        ),
        (b"", "no code pair; write under [codes]: pair = 'NBC 2015 + A23.3-14'"),
        (b"codes = 3", "'codes' must be a table; write [codes]"),
        (b"drawings = 3\n[codes]\npair = 'x'", "'drawings' must be a list of tables"),
        (b"#" * 1_000_001, "larger than 1 MB"),
        (b"[codes]\npair = 'x'\n[project]\ncleint = 'A'", "did you mean 'client'?"),
        (b"[codes]\npair = 'x'\n[projct]\nname = 'A'", "did you mean 'project'?"),
        (b"[codes]\npair = {a = 1}", "codes.pair is no text"),
        (b"criteria = 5\n[codes]\npair = 'x'", "'criteria' must be a table"),
        (b"[project]\nname = nan", "project.name is no number that can be kept"),
        (b"[project]\nname = 123456789012345678901234567890", "project.name is no number"),
        (b"[project]\nname = " + b"1" * 5000, "not valid TOML"),
        (b"[criteria]\nx = " + b"[" * 5000, "not valid TOML"),
        (b"[criteria]\nx = [[[1]]]", "criteria.x.1 is nested too deeply"),
        (
            b"[codes]\npair = 'x'\n[[confirmed]]\nclause = '10.1'\nedition = 'X'\non = 2026-11-20",
            "confirmed: row 1 has no 'by'; write clause, edition, by and on",
        ),
    ],
)
def test_wrong_project_files(tmp_path: Path, content: bytes, sentence: str) -> None:
    path = tmp_path / "project.toml"
    path.write_bytes(content)
    with pytest.raises(UserError) as caught:
        Sheet.open("B1", project=path)
    assert sentence in str(caught.value)
    assert str(path) in str(caught.value)


def test_a_mark_that_editors_put_in_front_is_no_fault(tmp_path: Path) -> None:
    path = tmp_path / "project.toml"
    path.write_text("[codes]\npair = 'NBC 2015 + A23.3-14'\n", encoding="utf-8-sig")
    assert Sheet.open("B1", project=path).project["codes"]["pair"] == "NBC 2015 + A23.3-14"
