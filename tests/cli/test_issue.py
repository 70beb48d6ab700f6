from __future__ import annotations

import json
import os
import re
from collections.abc import Callable
from pathlib import Path
from typing import Any

import ezdxf.filemanagement as ezdxf
import pytest

from lineproof.cli import main
from lineproof.notebook.execute import execute
from lineproof.package import records_in_html, records_in_pdf
from lineproof.record import MIME

Notebook = dict[str, Any]
NAMES = ["beam.html", "beam.json", "beam.pdf"]


def save(notebook: Notebook, path: Path) -> Path:
    path.write_text(json.dumps(notebook), encoding="utf-8")
    return path


def files_in(folder: Path) -> list[str]:
    return sorted(str(p.relative_to(folder)) for p in folder.rglob("*") if p.is_file())


def test_a_calc_is_issued_into_one_folder_beside_it(
    beam_file: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    before = beam_file.read_bytes()
    assert main(["issue", str(beam_file)]) == 0
    folder = beam_file.parent / "issued"
    assert files_in(folder) == NAMES
    record = json.loads((folder / "beam.json").read_text(encoding="utf-8"))
    assert records_in_pdf((folder / "beam.pdf").read_bytes()) == [record]
    assert records_in_html((folder / "beam.html").read_text(encoding="utf-8")) == [record]
    assert beam_file.read_bytes() == before
    said = capsys.readouterr()
    assert [line for line in said.out.splitlines() if line.startswith(str(folder))] == [
        str(folder / f"beam.{kind}") for kind in ("pdf", "html", "json")
    ]
    assert said.err.splitlines() == [f"running {beam_file}", f"printing {folder}"]


@pytest.mark.parametrize("into", ["", "  "])
def test_an_empty_folder_is_not_the_one_that_is_open(
    beam_file: Path, into: str, capsys: pytest.CaptureFixture[str], monkeypatch: pytest.MonkeyPatch
) -> None:
    """As from a script whose variable is not set; nothing is written anywhere."""
    monkeypatch.chdir(beam_file.parent)
    before = files_in(beam_file.parent)
    with pytest.raises(SystemExit) as stopped:
        main(["issue", str(beam_file), "--into", into])
    assert stopped.value.code == 2
    said = capsys.readouterr().err
    assert f"--into: {into!r} is no path; write the name of a file or folder" in said
    assert files_in(beam_file.parent) == before


def test_issuing_twice_gives_the_same_bytes(beam_file: Path) -> None:
    made = []
    for name in ("first", "second"):
        folder = beam_file.parent / name
        assert main(["issue", str(beam_file), "--into", str(folder)]) == 0
        made.append({p.name: p.read_bytes() for p in folder.iterdir()})
    assert made[0] == made[1]


def test_a_calc_never_run_is_run_and_issued(unrun: Notebook, tmp_path: Path) -> None:
    path = save(unrun, tmp_path / "beam.ipynb")
    before = path.read_bytes()
    assert main(["issue", str(path), "--into", str(tmp_path / "out")]) == 0
    assert files_in(tmp_path / "out") == NAMES
    assert path.read_bytes() == before


def media_box(pdf: bytes) -> tuple[float, float]:
    found = re.search(rb"/MediaBox\s*\[\s*0 0 ([\d.]+) ([\d.]+)\s*\]", pdf)
    assert found is not None
    return float(found[1]), float(found[2])


def test_paper_is_letter_unless_a4_is_asked_for(beam_file: Path) -> None:
    # 8.5 x 11 in at 72 points per inch; ISO 216: 210 x 297 mm at 72/25.4 points per mm.
    assert main(["issue", str(beam_file)]) == 0
    pdf = beam_file.parent / "issued" / "beam.pdf"
    assert media_box(pdf.read_bytes()) == pytest.approx((612, 792), abs=0.1)
    assert main(["issue", str(beam_file), "--paper", "a4"]) == 0
    assert media_box(pdf.read_bytes()) == pytest.approx((595.28, 841.89), abs=0.1)


def test_a_check_that_fails_is_issued_and_said(
    unrun: Notebook, tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    # By hand: M_r = 456.1 kN.m for 2500 mm2, less than 500 kN.m.
    unrun["cells"][2]["source"] = 'M_f = "500 kN.m"\nA_s = "2500 mm2"'
    path = save(unrun, tmp_path / "beam.ipynb")
    assert main(["issue", str(path)]) == 1
    assert files_in(tmp_path / "issued") == NAMES
    # 500/456.1 = 1.096
    said = capsys.readouterr().out
    assert "B1: 2.3 Moment resistance (Flexure at midspan) does not hold; ratio 1.10" in said


def test_an_exception_the_engineer_accepted_is_said_with_his_initials(
    unrun: Notebook, tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    unrun["cells"][2]["source"] = 'M_f = "500 kN.m"\nA_s = "2500 mm2"'
    unrun["cells"][5]["source"] = unrun["cells"][5]["source"].replace(
        'key="moment"',
        'key="moment", accepted="shored until the topping is placed", initials="A.B."',
    )
    assert main(["issue", str(save(unrun, tmp_path / "beam.ipynb"))]) == 1
    said = capsys.readouterr().out
    assert (
        "Moment resistance (Flexure at midspan) does not hold; ratio 1.10; accepted by A.B." in said
    )


def test_two_calcs_make_one_package(
    unrun: Notebook, tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    first = save(unrun, tmp_path / "one.ipynb")
    unrun["cells"][3]["source"] = unrun["cells"][3]["source"].replace('"B1"', '"B2"')
    second = save(unrun, tmp_path / "two.ipynb")
    assert main(["issue", str(first), str(second), "--into", str(tmp_path / "out")]) == 0
    assert files_in(tmp_path / "out") == ["one.json", "package.html", "package.pdf", "two.json"]
    records = records_in_pdf((tmp_path / "out" / "package.pdf").read_bytes())
    assert [record["calc"]["id"] for record in records] == ["B1", "B2"]
    capsys.readouterr()
    assert main(["lines", str(tmp_path / "out" / "package.pdf"), "--json"]) == 0
    data = json.loads(capsys.readouterr().out)
    assert data["calc"] == "B1, B2"
    assert [line["calc"] for line in data["lines"]] == ["B1"] * 12 + ["B2"] * 12


DRAWN = """\
from lineproof.drawing import Dimension, Figure, Line, to_json
figure = Figure(50, 20, 0.01, (5, 5), (
    Line((0, 0), (4000, 0)), Dimension((0, 0), (4000, 0), "horizontal", 5)), "A line")
with sheet.part("shown", "Drawing and schedule"):
    sheet.figure("line", to_json(figure), title="A line", alt="A line", front=1, dxf="elevation")
    sheet.table("bars", ["Mark", "Length, mm"], [["B1", "4000"], ["=x", "-1"]],
                title="Bars", front=2, csv="bar-schedule")
"""
"""A cell that draws a line of 4 m and lists bars."""


def drawn(notebook: Notebook, calc_id: str = "B1") -> Notebook:
    made: Notebook = json.loads(json.dumps(notebook))
    made["cells"][3]["source"] = made["cells"][3]["source"].replace('"B1"', f'"{calc_id}"')
    made["cells"][5]["source"] += DRAWN
    return made


def test_drawings_and_tables_are_issued_beside_the_package(
    unrun: Notebook, tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    path = save(drawn(unrun, "B 1"), tmp_path / "beam.ipynb")
    for name in ("first", "second"):
        assert main(["issue", str(path), "--into", str(tmp_path / name)]) == 0
    first = tmp_path / "first"
    assert files_in(first) == ["B-1-bar-schedule.csv", "B-1-elevation.dxf", *NAMES]
    assert (first / "B-1-bar-schedule.csv").read_bytes() == (
        b'\xef\xbb\xbfCalc,Mark,"Length, mm"\r\nB 1,B1,4000\r\nB 1,\'=x,-1\r\n'
    )
    (line,) = ezdxf.readfile(first / "B-1-elevation.dxf").modelspace().query("LINE")
    assert (line.dxf.end.x, line.dxf.layer) == (4000.0, "S-CONCRETE")
    for file in first.iterdir():
        assert file.read_bytes() == (tmp_path / "second" / file.name).read_bytes()
    assert str(first / "B-1-elevation.dxf") in capsys.readouterr().out.splitlines()


def test_drawings_of_an_earlier_issue_do_not_stay_beside_the_new_ones(
    unrun: Notebook, tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    folder = tmp_path / "issued"
    path = save(drawn(unrun), tmp_path / "beam.ipynb")
    assert main(["issue", str(path)]) == 0
    (folder / "B1-own.csv").write_text("of the user's own")
    unrun["cells"][5]["source"] += DRAWN.replace("elevation", "section-a")
    save(unrun, path)
    capsys.readouterr()
    assert main(["issue", str(path)]) == 0
    assert files_in(folder) == ["B1-bar-schedule.csv", "B1-own.csv", "B1-section-a.dxf", *NAMES]
    gone = folder / "B1-elevation.dxf"
    assert f"{gone}: of the earlier issue, not made by this one; removed" in capsys.readouterr().err


def test_tables_of_two_calcs_stand_in_one_file_as_well(
    unrun: Notebook, tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    paths = [save(drawn(unrun, name), tmp_path / f"{name}.ipynb") for name in ("B1", "B2")]
    issue = ["issue", *map(str, paths), "--into", str(tmp_path / "out")]
    assert main(issue) == 0
    joined = tmp_path / "out" / "package-bar-schedule.csv"
    assert joined.read_text("utf-8-sig").splitlines() == [
        'Calc,Mark,"Length, mm"', "B1,B1,4000", "B1,'=x,-1", "B2,B1,4000", "B2,'=x,-1",
    ]  # fmt: skip
    save(unrun, paths[0])  # lists no bars any more: the old file would be taken for that of both
    capsys.readouterr()
    assert main(issue) == 0
    assert not joined.exists()
    assert f"{joined}: of the earlier issue" in capsys.readouterr().err


def test_drawings_of_two_calcs_do_not_overwrite_each_other(
    unrun: Notebook, tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    paths = [save(drawn(unrun, name), tmp_path / f"{n}.ipynb")
             for n, name in enumerate(("B 1", "b-1"))]  # fmt: skip
    said = refused(["issue", *map(str, paths), "--into", str(tmp_path / "out")], capsys)
    assert "b-1: b-1-elevation.dxf is already a file of another calc of the package" in said
    assert "b-1: b-1-bar-schedule.csv is already a file" in said
    assert not (tmp_path / "out").exists()


def test_a_drawing_that_cannot_be_written_leaves_nothing(
    unrun: Notebook, tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    path = save(drawn(unrun), tmp_path / "beam.ipynb")
    folder = tmp_path / "issued"
    (folder / "B1-elevation.dxf").mkdir(parents=True)
    assert "B1-elevation.dxf: cannot be written" in refused(["issue", str(path)], capsys)
    assert files_in(folder) == []


def test_a_figure_that_cannot_be_drawn_is_refused(
    unrun: Notebook, tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    unrun["cells"][5]["source"] += (
        'with sheet.part("shown", "Shown"):\n'
        '    sheet.figure("f", {"shapes": []}, title="F", alt="F", dxf="f")\n'
    )
    path = save(unrun, tmp_path / "beam.ipynb")
    assert "figure" in refused(["issue", str(path)], capsys)
    assert files_in(tmp_path) == ["beam.ipynb"]


def refused(arguments: list[str], capsys: pytest.CaptureFixture[str]) -> str:
    capsys.readouterr()
    assert main(arguments) == 2
    said = capsys.readouterr()
    assert "Traceback" not in said.err
    assert said.out == ""
    return said.err


def edited(beam: Notebook, folder: Path) -> Path:
    """Write a notebook whose input was changed after it was run."""
    beam["cells"][2]["source"] = 'M_f = "400 kN.m"\nA_s = "2500 mm2"'
    return save(beam, folder / "beam.ipynb")


def test_stored_values_that_disagree_are_listed_and_refused(
    beam: Notebook, tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    path = edited(beam, tmp_path)
    before = path.read_bytes()
    said = refused(["issue", str(path)], capsys)
    assert 'cell 3 (M_f = "400 kN.m") was changed after it was run' in said
    assert "2 lines differ from a re-run" in said
    assert "  data/M_f: value stored 385 kN.m, made again 400 kN.m" in said
    assert "  flexure/moment: left side stored 385 kN.m, made again 400 kN.m" in said
    assert "nothing has been issued" in said
    assert files_in(tmp_path) == ["beam.ipynb"]
    assert path.read_bytes() == before


def test_a_tampered_value_is_found(
    beam: Notebook, tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    record = beam["cells"][-1]["outputs"][0]["data"][MIME]
    record["parts"][1]["entries"][1]["value"] = 556.1
    said = refused(["issue", str(save(beam, tmp_path / "beam.ipynb"))], capsys)
    assert "1 line differs from a re-run" in said
    assert "  flexure/M_r: value stored 556.1 kN.m, made again 456.1023" in said


def test_update_stores_the_new_values_and_issues(beam: Notebook, tmp_path: Path) -> None:
    path = edited(beam, tmp_path)
    assert main(["issue", str(path), "--update"]) == 0
    stored = path.read_text(encoding="utf-8")
    assert stored == execute(json.loads(stored), "beam.ipynb", tmp_path)
    record = json.loads((tmp_path / "issued" / "beam.json").read_text(encoding="utf-8"))
    assert record["parts"][0]["entries"][7]["printed"]["result"] == "400"
    assert main(["recheck", str(path)]) == 0


def test_update_takes_over_a_calc_whose_last_run_failed(beam: Notebook, tmp_path: Path) -> None:
    beam["cells"][5]["outputs"] = [
        {"output_type": "error", "ename": "UserError", "evalue": "wrong", "traceback": []}
    ]
    beam["cells"][6]["outputs"] = []
    path = save(beam, tmp_path / "beam.ipynb")
    assert main(["issue", str(path)]) == 2
    assert main(["issue", str(path), "--update"]) == 0


def test_update_writes_through_a_link(beam: Notebook, tmp_path: Path) -> None:
    path = edited(beam, tmp_path)
    link = tmp_path / "link.ipynb"
    link.symlink_to(path)
    assert main(["issue", str(link), "--update"]) == 0
    assert link.is_symlink()
    assert main(["recheck", str(path)]) == 0


def test_a_folder_name_that_no_disk_can_hold(
    beam_file: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    arguments = ["issue", str(beam_file), "--into", str(beam_file.parent / ("a" * 300))]
    assert "choose another folder with --into" in refused(arguments, capsys)


def without_parameters(notebook: Notebook) -> None:
    notebook["cells"][2]["metadata"] = {}


def with_hostile_formula(notebook: Notebook) -> None:
    record = notebook["cells"][-1]["outputs"][0]["data"][MIME]
    record["parts"][1]["entries"][0]["formula"] = "a = __import__('os').system('true')"


def with_wrong_input(notebook: Notebook) -> None:
    notebook["cells"][2]["source"] = 'M_f = "385 kn.m"\nA_s = "-2500"'


def with_raw_html(notebook: Notebook) -> None:
    notebook["cells"][0]["source"] = "<b>bold</b>"


def with_unknown_value(notebook: Notebook) -> None:
    notebook["cells"][4]["source"] = "It is {{ V_r }}."


@pytest.mark.parametrize(
    ("damage", "said"),
    [
        (without_parameters, "no cell with the inputs"),
        (with_hostile_formula, "__import__"),
        (with_wrong_input, "kn.m"),
        (with_raw_html, "raw HTML"),
        (with_unknown_value, "V_r"),
    ],
)
def test_bad_notebooks_are_refused_and_nothing_is_written(
    beam: Notebook,
    tmp_path: Path,
    capsys: pytest.CaptureFixture[str],
    damage: Callable[[Notebook], None],
    said: str,
) -> None:
    damage(beam)
    path = save(beam, tmp_path / "beam.ipynb")
    assert said in refused(["issue", str(path)], capsys)
    assert files_in(tmp_path) == ["beam.ipynb"]


def test_faults_of_all_files_are_named_at_once(
    tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    (tmp_path / "text.ipynb").write_text("no notebook")
    said = refused(["issue", *[str(tmp_path / f"{n}.ipynb") for n in ("absent", "text")]], capsys)
    assert "absent.ipynb: cannot be read (No such file or directory)" in said
    assert "text.ipynb: not a notebook" in said


def test_a_file_in_place_of_the_folder(beam_file: Path, capsys: pytest.CaptureFixture[str]) -> None:
    place = beam_file.parent / "taken"
    place.write_text("mine")
    for into in (place, place / "below"):
        said = refused(["issue", str(beam_file), "--into", str(into)], capsys)
        assert said == f"{place}: is a file, not a folder; choose another with --into\n"
    assert place.read_text() == "mine"
    assert files_in(beam_file.parent) == ["beam.ipynb", "taken"]


def test_a_folder_that_cannot_be_written(
    beam_file: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    said = refused(["issue", str(beam_file), "--into", "/proc/lineproof"], capsys)
    assert "/proc/lineproof: cannot be written" in said
    assert "choose another folder with --into" in said


def test_an_issue_is_replaced_whole_or_not_at_all(
    beam_file: Path, capsys: pytest.CaptureFixture[str], monkeypatch: pytest.MonkeyPatch
) -> None:
    folder = beam_file.parent / "issued"
    folder.mkdir()
    for name in NAMES:
        (folder / name).write_text(f"old {name}")
    replace = Path.replace

    def fails_at_the_last(self: Path, target: str | os.PathLike[str]) -> Path:
        if Path(target).name == "beam.json" and "old" not in self.name:
            raise OSError(28, "No space left on device", str(target))
        return replace(self, target)

    monkeypatch.setattr(Path, "replace", fails_at_the_last)
    said = refused(["issue", str(beam_file)], capsys)
    assert "beam.json: cannot be written (No space left on device)" in said
    assert files_in(folder) == NAMES
    assert [(folder / name).read_text() for name in NAMES] == [f"old {name}" for name in NAMES]


def test_two_notebooks_of_one_name(
    beam_file: Path, tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    other = tmp_path / "other" / "beam.ipynb"
    other.parent.mkdir()
    other.write_bytes(beam_file.read_bytes())
    said = refused(["issue", str(beam_file), str(other)], capsys)
    assert "two notebooks are called 'beam'" in said


def test_two_calcs_of_one_id(beam_file: Path, capsys: pytest.CaptureFixture[str]) -> None:
    other = beam_file.with_name("copy.ipynb")
    other.write_bytes(beam_file.read_bytes())
    said = refused(["issue", str(beam_file), str(other)], capsys)
    assert "its calc id 'B1' is that of" in said
    assert "give each calc its own in Sheet.open(...)" in said


def test_a_notebook_named_in_two_ways_is_one(
    beam_file: Path, capsys: pytest.CaptureFixture[str], monkeypatch: pytest.MonkeyPatch
) -> None:
    monkeypatch.chdir(beam_file.parent)
    assert main(["issue", "beam.ipynb", str(beam_file), "--into", "out"]) == 0
    assert files_in(Path("out")) == NAMES
    assert capsys.readouterr().err.splitlines()[:1] == ["running beam.ipynb"]
