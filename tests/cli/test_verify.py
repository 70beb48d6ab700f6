"""``lineproof verify``: what it prints, its exit codes, its messages."""

from __future__ import annotations

import json
from pathlib import Path

import pytest
from tests.audit import verifying as by

from lineproof.cli import main


@pytest.fixture
def page(tmp_path: Path) -> Path:
    path = tmp_path / "beam.html"
    path.write_text(by.html(), encoding="utf-8")
    return path


def test_an_intact_package_says_so_and_returns_0(
    page: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    assert main(["verify", str(page)]) == 0

    lines = capsys.readouterr().out.splitlines()
    assert lines[0] == "beam.html: intact"
    assert f"calculation H1, record {by.record().digest}" in lines[1]


def test_an_altered_package_names_the_lines_and_returns_1(
    page: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    place = by.html().index(">6<", by.html().index('id="given/l"')) + 1
    page.write_text(by.html()[:place] + "7" + by.html()[place + 1 :], encoding="utf-8")

    assert main(["verify", str(page)]) == 1

    told = capsys.readouterr().out
    assert "beam.html: altered" in told
    assert "H1, line 1.15, given/l: the print differs" in told


def test_json_holds_the_same(page: Path, capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["verify", str(page), "--json"]) == 0

    data = json.loads(capsys.readouterr().out)
    assert (data["outcome"], data["alterations"], data["sentences"]) == ("intact", [], [])
    assert data["proofs"][0]["calc"] == "H1"


def test_a_stripped_package_is_compared_with_a_record(
    page: Path, tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    record = tmp_path / "beam.json"
    record.write_text(by.record().to_text(), encoding="utf-8")
    start = by.html().index('<script type="application/vnd.lineproof.record+json"')
    end = by.html().index("</script>", start) + len("</script>")
    page.write_text(by.html()[:start] + by.html()[end:], encoding="utf-8")

    assert main(["verify", str(page)]) == 1
    assert "compare them with --against RECORD" in capsys.readouterr().out
    assert main(["verify", str(page), "--against", str(record)]) == 1
    assert "what is printed is what the record given prints" in capsys.readouterr().out


def test_prose_is_named_as_not_provable_and_a_notebook_proves_it(
    beam_file: Path, tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    assert main(["issue", str(beam_file), "--into", str(tmp_path / "out")]) == 0
    capsys.readouterr()
    issued = tmp_path / "out" / "beam.pdf"

    assert main(["verify", str(issued)]) == 0
    assert "text outside the record, not provable from it: 2 place(s)" in capsys.readouterr().out
    assert main(["verify", str(issued), "--against", str(beam_file)]) == 0
    assert "outside the record" not in capsys.readouterr().out


@pytest.mark.parametrize(
    ("name", "content", "told"),
    [
        ("a.docx", b"", "not a printed package"),
        ("a.pdf", b"hello", "not a PDF"),
        ("a.html", b"\xff\xfe", "neither a PDF nor UTF-8 text"),
        ("missing.pdf", None, "cannot be read"),
    ],
)
def test_what_is_no_package_is_told_and_returns_2(
    tmp_path: Path, capsys: pytest.CaptureFixture[str], name: str, content: bytes | None, told: str
) -> None:
    path = tmp_path / name
    if content is not None:
        path.write_bytes(content)

    assert main(["verify", str(path)]) == 2
    assert told in capsys.readouterr().err


def test_a_file_of_others_returns_2(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    path = tmp_path / "other.pdf"
    path.write_bytes(by.plain_page("Letter"))

    assert main(["verify", str(path)]) == 2
    assert "other.pdf: not ours" in capsys.readouterr().out
