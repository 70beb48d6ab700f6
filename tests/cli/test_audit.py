"""The command audit: claims against a record by hand (tests/audit/hand.py), blanks, exit codes."""

from __future__ import annotations

import csv
import json
import math
import os
import subprocess
import sys
from pathlib import Path
from typing import Any

import pytest
from openpyxl import load_workbook
from tests.audit import hand
from tests.audit.hand import beam as hand_beam
from tests.beams import gallery

from lineproof.audit.data import Audit, Interval, Judged, Verdict
from lineproof.audit.graph import Graph
from lineproof.audit.review.read import read_review
from lineproof.cli import main
from lineproof.cli.audit_output import as_data
from lineproof.errors import UserError
from lineproof.notebook.audited import picked

Capture = pytest.CaptureFixture[str]
Notebook = dict[str, Any]


@pytest.fixture
def record_file(tmp_path: Path) -> Path:
    path = tmp_path / "beam.json"
    path.write_text(hand_beam().to_text(), encoding="utf-8")
    return path


def claims(folder: Path, **values: str) -> Path:
    """Write claims by symbol."""
    path = folder / "claims.csv"
    path.write_text("symbol,claimed\n" + "".join(f"{s},{v}\n" for s, v in values.items()))
    return path


def audit(*arguments: object) -> int:
    return main(["audit", *map(str, arguments)])


def test_claims_that_agree(record_file: Path, tmp_path: Path, capsys: Capture) -> None:
    file = claims(tmp_path, d="539 mm", M_r="207 kN.m", M_f="180 kN.m")
    assert audit(record_file, "--claims", file) == 0
    said = capsys.readouterr().out.splitlines()
    assert said[0].startswith("H1  Beam by hand  digest ")
    assert said[1] == "3 claims: 3 agree; 17 lines not claimed"
    assert said[2] == "no findings"


def test_an_origin_with_slip_effects_and_what_carries_it(
    record_file: Path, tmp_path: Path, capsys: Capture
) -> None:
    """h for d in M_r: 408 000 x (600 - 32.489) = 231.54 kN.m against 206.64.

    The check M_f <= M_r: 180/231.5 = 0.777 as claimed, 180/206.6 = 0.871 with the right value.
    """
    file = claims(tmp_path, d="539 mm", a="65.0 mm", M_r="231.5 kN.m", M_f="180 kN.m")
    assert audit(record_file, "--claims", file) == 1
    said = capsys.readouterr().out
    assert "4 claims: 3 agree, 1 is the origin of an error; 16 lines not claimed" in said
    assert "1 finding" in said.splitlines()
    assert "major" in said.splitlines()
    assert "strength/M_r: " in said
    assert "231.5 kN·m does not follow from the values that the claim uses; 206.7 kN·m does" in said
    assert "h (1." in said  # the slip finder's sentence names h
    assert "utilisation from 0.78 as claimed to 0.87 with the right value, still holds" in said


def test_findings_come_by_what_they_matter(
    record_file: Path, tmp_path: Path, capsys: Capture
) -> None:
    """M_f 250 > 206.6 as claimed fails a check that holds; n_b 4 is right; f_y 300 hides nothing.

    h = 900 makes M_r 329 as claimed: the check seems easier than it is, but holds either way.
    b = 410 makes it 206.96: 0.870 for 0.871 is a minor matter.
    """
    file = claims(tmp_path, h="900 mm", w_f="20 kN/m", b="410 mm")
    assert audit(record_file, "--claims", file, "--json") == 1
    data = json.loads(capsys.readouterr().out)
    order = [(f["severity"], f["ids"][0]) for f in data["findings"]]
    assert order == [("major", "given/w_f"), ("major", "given/h"), ("minor", "given/b")]
    changes = [f["effects"][0]["right"] - f["effects"][0]["claimed"] for f in data["findings"]]
    assert changes == sorted(changes, reverse=True)


def test_a_claim_that_hides_a_failing_check_is_critical(tmp_path: Path, capsys: Capture) -> None:
    """M_f = 60 x 36/8 = 270 > 206.6: fails; with w_f = 40 claimed it would hold."""
    sheet = hand.sheet_of(givens=hand.GIVENS | {"w_f": "60 kN/m"})
    with sheet.part("checks", "Span 1: checks"):
        sheet.check("M_f <= M_r", key="strength", title="Moment resistance")
    path = tmp_path / "beam.json"
    path.write_text(sheet.close().to_text(), encoding="utf-8")
    assert audit(path, "--claims", claims(tmp_path, w_f="40 kN/m"), "--json") == 1
    (finding,) = json.loads(capsys.readouterr().out)["findings"]
    assert finding["severity"] == "critical"
    assert finding["effects"][0]["holds_as_claimed"] is True
    assert finding["effects"][0]["holds"] is False


def test_json_tells_every_claim(record_file: Path, tmp_path: Path, capsys: Capture) -> None:
    """M_r 209 by K_r 1.8; d 535 rounded down."""
    assert audit(record_file, "--claims", claims(tmp_path, d="535 mm"), "--json") == 0
    data = json.loads(capsys.readouterr().out)
    assert data["calc"] == "H1"
    assert data["counts"] == {"conservative rounding": 1, "not claimed": 19}
    (line,) = data["judged"]
    assert (line["id"], line["claimed"], line["row"]) == ("beam/d", "535 mm", 2)
    assert (line["unit"], line["right"]) == ("mm", pytest.approx(538.95))
    assert line["follows"] == pytest.approx([538.95, 538.95])
    assert audit(record_file, "--claims", claims(tmp_path, M_r="209 kN.m")) == 0
    assert "K_r read from a table as 1.8" in capsys.readouterr().out


def test_what_absurd_claims_lead_to_is_none_in_json() -> None:
    """A force of 1e99 beside a resistance of 1e-99 leaves a ratio anywhere: no number of JSON."""
    graph = Graph(hand_beam())
    claim = hand.typed(graph, "beam/a", "65.0")
    everywhere = Interval(-math.inf, math.inf)
    judged = Judged(claim.id, Verdict.AGREES, claim, everywhere, graph.stored[claim.id])
    (line,) = json.loads(json.dumps(as_data(Audit("H1", "", (judged,)), graph), allow_nan=False))[
        "judged"
    ]
    assert line["follows"] == [None, None]


@pytest.mark.parametrize(("option", "count"), [("--blank", 19), ("--blank-full", 20)])
def test_a_blank_is_written_once(
    record_file: Path, tmp_path: Path, capsys: Capture, option: str, count: int
) -> None:
    path = tmp_path / "blank.csv"
    assert audit(record_file, option, path) == 0
    assert "fill in the column 'claimed', then give it as --claims" in capsys.readouterr().out
    rows = list(csv.reader(path.read_text(encoding="utf-8-sig").splitlines()))
    assert rows[0] == ["id", "label", "place", "symbol", "title", "unit", "claimed", "where"]
    assert len(rows) - 1 == count
    path.write_text("filled in by hand")
    assert audit(record_file, option, path) == 2
    assert "exists already and may be filled in" in capsys.readouterr().err
    assert path.read_text() == "filled in by hand"


def test_a_blank_workbook(record_file: Path, tmp_path: Path) -> None:
    path = tmp_path / "blank.xlsx"
    assert audit(record_file, "--blank", path) == 0
    sheet = load_workbook(path).worksheets[0]
    assert sheet["A1"].value == "id"
    assert sheet["G2"].number_format == "@"
    assert not list(tmp_path.glob(".*"))  # nothing half written is left


@pytest.mark.parametrize(
    ("arguments", "said"),
    [
        (["--blank", "blank.txt"], "write a name in .csv or .xlsx"),
        (["--claims", "none.csv"], "none.csv: cannot be read"),
        (["--claims", "beam.json"], "beam.json: neither .csv nor .xlsx"),
        (["--calc", "B9"], "holds no calc 'B9'; write --calc with one of H1"),
        (["--blank", "no/such/folder/blank.csv", "--calc", "B9"], "holds no calc 'B9'"),
    ],
)
def test_wrong_input(
    record_file: Path, tmp_path: Path, capsys: Capture, monkeypatch: pytest.MonkeyPatch,
    arguments: list[str], said: str,
) -> None:  # fmt: skip
    monkeypatch.chdir(tmp_path)
    before = sorted(path.name for path in tmp_path.iterdir())
    assert audit(record_file, *arguments) == 2
    assert said in capsys.readouterr().err
    assert sorted(path.name for path in tmp_path.iterdir()) == before


def test_claims_and_a_blank_are_not_asked_for_together(
    record_file: Path, tmp_path: Path, capsys: Capture
) -> None:
    with pytest.raises(SystemExit) as stopped:
        audit(record_file, "--blank", tmp_path / "b.csv", "--claims", tmp_path / "c.csv")
    assert stopped.value.code == 2
    assert "not allowed with" in capsys.readouterr().err


def test_faults_of_claims_come_together(record_file: Path, tmp_path: Path, capsys: Capture) -> None:
    file = claims(tmp_path, d="539", M_rr="1 mm", a="=1+1")
    assert audit(record_file, "--claims", file) == 2
    said = capsys.readouterr().err.splitlines()
    assert len(said) == 3
    assert all(line.startswith(f"{file}: row ") for line in said)


def test_a_record_changed_by_hand_judges_nobody(
    record_file: Path, tmp_path: Path, capsys: Capture
) -> None:
    """d stored as 545 while its formula gives 538.95."""
    data = json.loads(record_file.read_text())
    (part,) = [p for p in data["parts"] if p["key"] == "beam"]
    (line,) = [e for e in part["entries"] if e["symbol"] == "d"]
    line["value"] = 545.0
    record_file.write_text(json.dumps(data))
    assert audit(record_file, "--claims", claims(tmp_path, d="539 mm")) == 2
    assert "does not follow from its own inputs (beam/d: " in capsys.readouterr().err
    assert audit(record_file) == 1  # alone it is searched, and says so
    assert "beam/d" in capsys.readouterr().out


def test_several_calcs_in_one_package() -> None:
    first, second = hand_beam(), hand_beam("a <= h_f")
    second.data["calc"]["id"] = "H2"
    path = Path("package.pdf")
    assert picked([first, second], path, "H2") is second
    with pytest.raises(UserError, match=r"holds 2 calcs \(H1, H2\); say which: --calc H1"):
        picked([first, second], path, None)
    with pytest.raises(UserError, match=r"holds the calc 'H1' 2 times"):
        picked([first, first], path, "H1")


def test_a_notebook_alone_and_against_claims(
    beam_file: Path, tmp_path: Path, capsys: Capture
) -> None:
    """The notebook of the tests has M_r = 456.1 kN.m (tests/conftest.py)."""
    before = beam_file.read_bytes()
    assert audit(beam_file, "--claims", claims(tmp_path, M_r="456 kN.m")) == 0
    assert "1 claim: 1 agrees" in capsys.readouterr().out
    assert audit(beam_file) == 1
    said = capsys.readouterr().out
    assert "Shear resistance: not checked. [11.3.1]" in said
    assert "changed" not in said
    assert beam_file.read_bytes() == before


def _plain(folder: Path, *cells: str) -> Path:
    """Write a notebook of plain Python that was run."""
    made = [
        {
            "cell_type": "code",
            "source": source,
            "execution_count": at,
            "metadata": {},
            "outputs": [],
        }
        for at, source in enumerate(cells, 1)
    ]
    path = folder / "own.ipynb"
    path.write_text(
        json.dumps({"cells": made, "metadata": {}, "nbformat": 4, "nbformat_minor": 5}), "utf-8"
    )
    return path


def test_a_notebook_of_plain_python_is_read_as_code(tmp_path: Path, capsys: Capture) -> None:
    """M_r without phi_s, 10.1; ``shear`` is no symbol of the catalogue."""
    own = _plain(
        tmp_path, "As, fy, d, a = 2000, 400, 566, 107", "Mr = As*fy*(d - a/2)\nshear = 2*d"
    )
    assert audit(own) == 1
    said = capsys.readouterr().out
    assert said.startswith("own.ipynb\nnote: It holds no record")
    assert "Compared with the catalogue, by their names: Mr." in said
    assert "not compared: shear." in said
    assert "cell 2, Mr: Mr = As*fy*(d - a/2) differs from 10.1: phi_s is missing" in said
    assert audit(own, "--json") == 1
    assert json.loads(capsys.readouterr().out)["judged"] == []


@pytest.mark.parametrize("option", ["--claims", "--blank", "--into", "--drawing"])
def test_what_needs_a_record_is_refused_to_plain_python(
    option: str, tmp_path: Path, capsys: Capture
) -> None:
    assert audit(_plain(tmp_path, "x = 1"), option, tmp_path / "t.csv") == 2
    assert "holds no record" in capsys.readouterr().err


def test_a_calc_that_was_not_closed_is_no_plain_python(tmp_path: Path, capsys: Capture) -> None:
    assert audit(_plain(tmp_path, "from lineproof import Sheet, beams", "x = 1")) == 2
    assert "end it with a cell 'sheet.close()'" in capsys.readouterr().err


def test_a_cell_changed_after_its_run_is_found(
    beam: Notebook, tmp_path: Path, capsys: Capture
) -> None:
    """A_s typed as 3000 under outputs that were made with 2500."""
    source = beam["cells"][2]["source"]
    beam["cells"][2]["source"] = "".join(source).replace("2500", "3000")
    path = tmp_path / "beam.ipynb"
    path.write_text(json.dumps(beam))
    assert audit(path) == 1
    said = capsys.readouterr().out
    assert "was changed after it was run; run all cells, then save" in said
    assert "cell 3 says A_s = '3000 mm2'; the record was made with 2500 mm2" in said


def test_nothing_of_a_file_is_run(record_file: Path, tmp_path: Path) -> None:
    """Text that looks like code stays text, in a fresh process."""
    mark = tmp_path / "ran"
    bad = f"__import__('pathlib').Path({str(mark)!r}).touch()"
    file = tmp_path / "claims.csv"
    file.write_text(f'symbol,claimed\n"{bad}",1\nd,"{bad}"\n')
    done = subprocess.run(
        [sys.executable, "-m", "lineproof", "audit", str(record_file), "--claims", str(file)],
        capture_output=True, text=True, check=False,
    )  # fmt: skip
    assert done.returncode == 2
    assert "Traceback" not in done.stderr
    assert not mark.exists()


def test_the_report_is_printed_whole(record_file: Path, tmp_path: Path, capsys: Capture) -> None:
    """d 600 for 538.95: the report names the finding; its CSV holds the line."""
    folder = tmp_path / "report"
    file = claims(tmp_path, d="600 mm")
    arguments = ("--claims", file, "--into", folder, "--checker", "N. N.", "--date", "2026-11-20")
    assert audit(record_file, *arguments) == 1
    names = ["H1-audit-findings.csv", "H1-audit-judged.csv", "H1-audit.html", "H1-audit.pdf"]
    assert sorted(path.name for path in folder.iterdir()) == names
    assert (folder / "H1-audit.pdf").read_bytes()[:5] == b"%PDF-"
    assert "600 mm does not follow" in (folder / names[0]).read_text(encoding="utf-8-sig")
    assert "H1-audit.pdf" in capsys.readouterr().err


def test_a_wrong_date_writes_nothing(record_file: Path, tmp_path: Path, capsys: Capture) -> None:
    file = claims(tmp_path, d="539 mm")
    arguments = ("--claims", file, "--into", tmp_path / "report", "--date", "tomorrow")
    assert audit(record_file, *arguments) == 2
    assert "tomorrow" in capsys.readouterr().err
    assert not (tmp_path / "report").exists()


def test_a_drawing_against_the_calc(tmp_path: Path, capsys: Capture) -> None:
    """The gallery beam is 620 deep; drawn 600 it is a finding, and the blank holds no value."""
    path = tmp_path / "beam.json"
    path.write_text(gallery.record_of().to_text(), encoding="utf-8")
    blank = tmp_path / "drawing.csv"
    assert audit(path, "--blank-drawing", blank) == 0
    assert "then give it as --drawing" in capsys.readouterr().out
    rows = list(csv.DictReader(blank.read_text(encoding="utf-8-sig").splitlines()))
    assert {row["drawn"] for row in rows} == {""}
    depth = next(row for row in rows if row["item"] == "overall depth")
    blank.write_text(
        f"item,place,drawn,unit,drawing,revision\n{depth['item']},{depth['place']},600,mm,S-1,A\n"
    )
    assert audit(path, "--drawing", blank) == 1
    said = capsys.readouterr().out
    assert "given/h: Overall depth: drawn 600 mm, 620" in said
    blank.write_text("item,place,drawn,unit,drawing,revision\noverall dpth,,600,mm,S-1,A\n")
    assert audit(path, "--drawing", blank) == 2
    assert f"{blank}: " in capsys.readouterr().err


def test_findings_are_raised_in_a_review_once(
    record_file: Path, tmp_path: Path, capsys: Capture
) -> None:
    """By a named checker, with the lines they concern; again nothing new, a new claim one more."""
    file, review = claims(tmp_path, w_f="20 kN/m", b="410 mm"), tmp_path / "H1.review.json"
    assert audit(record_file, "--claims", file, "--review", review) == 2
    assert "findings are raised by a person; give --checker NAME" in capsys.readouterr().err
    assert not review.exists()

    checked = ("--review", review, "--checker", "Ana  Bell")
    assert audit(record_file, "--claims", file, *checked) == 1
    made = read_review(review.read_text(encoding="utf-8"))
    assert [(found.number, found.by, found.standing) for found in made.findings] == [
        (1, "Ana Bell", "open"), (2, "Ana Bell", "open"),
    ]  # fmt: skip
    assert {line for found in made.findings for line in found.lines} == {"given/w_f", "given/b"}
    assert made.initials("Ana Bell") == "AB"

    assert audit(record_file, "--claims", file, *checked) == 1
    assert read_review(review.read_text(encoding="utf-8")).findings == made.findings
    more = claims(tmp_path, w_f="20 kN/m", b="410 mm", h="900 mm")
    assert audit(record_file, "--claims", more, *checked) == 1
    again = read_review(review.read_text(encoding="utf-8")).findings
    assert (len(again), again[:2], again[2].lines) == (3, made.findings, ("given/h",))

    review.write_text(review.read_text(encoding="utf-8").replace('"H1"', '"H9"'), encoding="utf-8")
    before = review.read_bytes()
    assert audit(record_file, "--claims", file, *checked) == 2
    assert "is of calc 'H9', not of 'H1'" in capsys.readouterr().err
    assert review.read_bytes() == before


@pytest.mark.parametrize(
    ("table", "said"),
    [
        ("id,claimed\nbeam/d,539 mm\n",
         "row 1: no heading 'item', 'place', 'drawn'; --blank-drawing writes the table"),
        ("item,place,drawn\noverall depth,the beam,\n",
         "no row has a value in the column 'drawn'; write one"),
    ],
)  # fmt: skip
def test_a_table_of_something_else_is_no_drawing(
    record_file: Path, tmp_path: Path, capsys: Capture, table: str, said: str
) -> None:
    """Taken for a drawing it would show nothing of the beam, each of its items a finding."""
    file = tmp_path / "other.csv"
    file.write_text(table, encoding="utf-8")
    assert audit(record_file, "--drawing", file) == 2
    captured = capsys.readouterr()
    assert (captured.out, captured.err) == ("", f"{file}: {said}\n")


def test_a_name_or_a_day_that_goes_nowhere_is_refused(record_file: Path, capsys: Capture) -> None:
    assert audit(record_file, "--checker", "K. Mori", "--date", "tomorrow") == 2
    assert capsys.readouterr().err.splitlines() == [
        "--date is the day of a printed report; give --into DIR with it",
        "--checker stands in a report or a review; give --into DIR or --review FILE with it",
    ]


def test_a_name_that_no_folder_can_hold_gets_a_sentence(
    record_file: Path, tmp_path: Path, capsys: Capture
) -> None:
    """Names of files end at 255 bytes."""
    before = sorted(tmp_path.iterdir())
    assert audit(record_file, "--blank", str(tmp_path / f"{'a' * 300}.csv")) == 2
    assert "a.csv: cannot be reached (File name too long)" in capsys.readouterr().err
    assert sorted(tmp_path.iterdir()) == before


def test_the_name_of_a_file_does_not_steer_the_terminal(
    record_file: Path, tmp_path: Path, capsys: Capture
) -> None:
    assert audit(record_file, "--blank", str(tmp_path / "a\x1b[31m.csv")) == 0
    assert "\x1b" not in capsys.readouterr().out


@pytest.mark.parametrize("ending", [".json", ".html", ".pdf", ".ipynb"])
def test_a_pipe_in_place_of_a_record_is_refused(
    tmp_path: Path, capsys: Capture, ending: str
) -> None:
    pipe = tmp_path / f"calc{ending}"
    os.mkfifo(pipe)
    commands = [["audit", str(pipe)], ["review", str(pipe), "--marks", str(pipe)]]
    if ending in (".html", ".pdf"):
        commands.append(["verify", str(pipe)])
    for command in commands:
        assert main(command) == 2
        assert f"calc{ending}: cannot be read (a pipe or a device" in capsys.readouterr().err
