from __future__ import annotations

import errno
import io
import json
import re
import subprocess
import sys
from importlib.metadata import version
from pathlib import Path
from typing import Any

import pytest

from lineproof.cli import main
from lineproof.cli.files import write_all
from lineproof.cli.progress import Progress
from lineproof.errors import UserError
from lineproof.notebook.display import shown_hash
from lineproof.record import MIME

Notebook = dict[str, Any]
Capture = pytest.CaptureFixture[str]
KEYS = {"id", "part", "kind", "symbol", "value", "unit", "clause", "formula", "args"}


@pytest.fixture(scope="session")
def package(beam_text: str, tmp_path_factory: pytest.TempPathFactory) -> Path:
    """A folder with the beam's notebook and what was printed of it."""
    folder = tmp_path_factory.mktemp("package")
    (folder / "beam.ipynb").write_text(beam_text, encoding="utf-8")
    assert main(["issue", str(folder / "beam.ipynb"), "--into", str(folder)]) == 0
    return folder


# -- recheck -----------------------------------------------------------------------------------


def test_recheck_counts_the_lines_that_agree(beam_file: Path, capsys: Capture) -> None:
    before = beam_file.read_bytes()
    assert main(["recheck", str(beam_file)]) == 0
    assert capsys.readouterr().out == f"{beam_file}: 12 lines agree\n"
    assert beam_file.read_bytes() == before
    assert [path.name for path in beam_file.parent.iterdir()] == ["beam.ipynb"]


def test_recheck_lists_the_lines_that_differ(
    beam: Notebook, tmp_path: Path, capsys: Capture
) -> None:
    beam["cells"][-1]["outputs"][0]["data"][MIME]["parts"][1]["entries"][0]["value"] = 27.0
    path = tmp_path / "beam.ipynb"
    path.write_text(json.dumps(beam))
    before = path.read_bytes()
    assert main(["recheck", str(path)]) == 1
    said = capsys.readouterr().out
    assert "1 line differs from a re-run" in said
    assert "  flexure/a: value stored 27 mm, made again 26.818" in said
    assert path.read_bytes() == before


@pytest.mark.parametrize("command", ["recheck", "issue"])
def test_an_input_that_no_code_uses_is_refused(
    unrun: Notebook, tmp_path: Path, capsys: Capture, command: str
) -> None:
    """Added to the inputs and not to the call, it would be passed over in silence."""
    cell = next(c for c in unrun["cells"] if "parameters" in c["metadata"].get("tags", ()))
    cell["source"] = "".join(cell["source"]) + '\nreactions_csv = "reactions.csv"'
    path = tmp_path / "beam.ipynb"
    path.write_text(json.dumps(unrun), encoding="utf-8")

    assert main([command, str(path)]) == 2
    assert capsys.readouterr().err == (
        f"{path}: input reactions_csv is used nowhere, so it changes nothing; write "
        "reactions_csv=reactions_csv into the call that takes it, or take the line out\n"
    )
    assert [file.name for file in tmp_path.iterdir()] == ["beam.ipynb"]


def shown_by_hand(beam: Notebook, path: Path, *, with_hash: bool) -> None:
    """Store the beam with another resistance under its cell: 556 kN.m for 456; the record stays."""
    output = next(
        output
        for cell in beam["cells"]
        for output in cell.get("outputs", [])
        if "456" in "".join(output.get("data", {}).get("text/html", ""))
    )
    for kind in ("text/html", "text/plain"):
        output["data"][kind] = "".join(output["data"][kind]).replace("456", "556")
    if with_hash:
        output["metadata"]["lineproof"]["shown"] = shown_hash(output["data"])
    path.write_text(json.dumps(beam), encoding="utf-8")


@pytest.mark.parametrize("with_hash", [False, True])
def test_recheck_names_an_output_changed_by_hand(
    beam: Notebook, tmp_path: Path, capsys: Capture, *, with_hash: bool
) -> None:
    """The lines of the record agree all the same: what a reader sees is not what they say."""
    path = tmp_path / "beam.ipynb"
    shown_by_hand(beam, path, with_hash=with_hash)

    assert main(["recheck", str(path)]) == 1
    said = capsys.readouterr().out
    assert said.startswith(f"{path}: 12 lines agree\n")
    assert "shows part 'flexure' otherwise than" in said
    assert "its output was changed by hand" in said


def test_lines_names_an_output_changed_by_hand(
    beam: Notebook, tmp_path: Path, capsys: Capture
) -> None:
    path = tmp_path / "beam.ipynb"
    shown_by_hand(beam, path, with_hash=False)

    assert main(["lines", str(path)]) == 1
    said = capsys.readouterr()
    assert "flexure/M_r" in said.out
    assert f"{path}: cell" in said.err
    assert "shows part 'flexure' otherwise than it was run" in said.err


def test_recheck_refuses_a_calc_never_run(unrun: Notebook, tmp_path: Path, capsys: Capture) -> None:
    path = tmp_path / "beam.ipynb"
    path.write_text(json.dumps(unrun))
    assert main(["recheck", str(path)]) == 2
    assert "has not been run, so nothing is stored to compare" in capsys.readouterr().err


# -- lines -------------------------------------------------------------------------------------


@pytest.mark.parametrize("kind", ["ipynb", "pdf", "html", "json"])
def test_every_kind_of_file_gives_the_same_lines(package: Path, capsys: Capture, kind: str) -> None:
    assert main(["lines", str(package / f"beam.{kind}"), "--json"]) == 0
    data = json.loads(capsys.readouterr().out)
    assert data["calc"] == "B1"
    assert re.fullmatch("[0-9a-f]{16}", data["digest"])
    assert len(data["lines"]) == 12
    assert all(set(line) >= KEYS for line in data["lines"])


def test_a_line_carries_what_a_program_needs(package: Path, capsys: Capture) -> None:
    main(["lines", str(package / "beam.ipynb"), "--json"])
    lines = {line["id"]: line for line in json.loads(capsys.readouterr().out)["lines"]}
    resistance = lines["flexure/M_r"]
    # By hand: 0.85 x 2500 x 400 x (550 - 26.818/2) = 456.10e6 N.mm.
    assert resistance["value"] == pytest.approx(456.10, abs=5e-3)
    assert resistance["unit"] == "kN.m"
    assert resistance["part"] == "flexure"
    assert resistance["formula"] == "M_r = phi_s*A_s*f_y*(d - a/2)"
    assert resistance["args"]["a"] == "flexure/a"
    assert resistance["printed"]["result"] == "456"
    assert lines["data/M_f"]["typed"] == "385 kN.m"
    check = lines["flexure/moment"]
    assert check["holds"] is True
    assert check["value"] is None
    assert check["utilisation"] == pytest.approx(385 / 456.10, abs=1e-4)


def test_the_table_shows_every_line(package: Path, capsys: Capture) -> None:
    assert main(["lines", str(package / "beam.pdf")]) == 0
    text = re.sub(" +", " ", capsys.readouterr().out)
    assert "B1 Test beam B1 digest" in text
    assert "\n2.2 flexure/M_r 456 kN.m Moment resistance\n" in text
    assert "flexure/moment 385 <= 456 kN.m: holds, ratio 0.84 Moment resistance\n" in text


@pytest.mark.parametrize(
    ("name", "content", "said"),
    [
        ("a.txt", b"", "give one of .ipynb, .pdf, .html, .json"),
        ("a.pdf", b"%PDF-1.7 broken", "damaged"),
        ("a.html", b"<html></html>", "no record in this HTML file"),
        ("a.html", b"\xff\xfe", "not UTF-8 text"),
        ("a.json", b"{}", "not a lineproof record"),
        ("a.json", b"[" * 100_000, "not readable as JSON"),
        ("a.ipynb", b"{}", "is not read"),
    ],
)
def test_files_without_lines_are_refused(
    tmp_path: Path, capsys: Capture, name: str, content: bytes, said: str
) -> None:
    path = tmp_path / name
    path.write_bytes(content)
    assert main(["lines", str(path)]) == 2
    error = capsys.readouterr().err
    assert str(path) in error
    assert said in error


def test_a_missing_file_is_named(tmp_path: Path, capsys: Capture) -> None:
    for kind in ("pdf", "html", "json", "ipynb"):
        assert main(["lines", str(tmp_path / f"absent.{kind}")]) == 2
        assert "cannot be read (No such file or directory)" in capsys.readouterr().err


def test_a_hostile_record_is_refused_and_shown_harmless(
    beam: Notebook, tmp_path: Path, capsys: Capture
) -> None:
    record = beam["cells"][-1]["outputs"][0]["data"][MIME]
    record["parts"][1]["entries"][0]["formula"] = "a = (lambda: 1)() \x1b[31m"
    path = tmp_path / "record.json"
    path.write_text(json.dumps(record))
    assert main(["lines", str(path)]) == 2
    assert "\x1b" not in capsys.readouterr().err


def test_titles_cannot_steer_the_terminal(beam: Notebook, tmp_path: Path, capsys: Capture) -> None:
    record = beam["cells"][-1]["outputs"][0]["data"][MIME]
    record["parts"][0]["entries"][0]["title"] = "width \x1b]0;owned\x07"
    path = tmp_path / "record.json"
    path.write_text(json.dumps(record))
    assert main(["lines", str(path)]) == 0
    assert "<U+001B>]0;owned<U+0007>" in capsys.readouterr().out


def test_output_closed_by_its_reader_is_no_error(package: Path) -> None:
    command = f"{sys.executable} -m lineproof lines {package / 'beam.json'} --json | head -c 1"
    done = subprocess.run(command, shell=True, capture_output=True, text=True, check=True)  # noqa: S602
    assert done.stderr == ""


# -- the command itself ------------------------------------------------------------------------


def run(*arguments: str) -> subprocess.CompletedProcess[str]:
    command = [sys.executable, "-m", "lineproof", *arguments]
    return subprocess.run(command, capture_output=True, text=True, check=False, timeout=120)


def test_the_module_runs_as_the_command() -> None:
    assert run("--version").stdout == f"lineproof {version('lineproof')}\n"
    assert run().returncode == 2
    assert run("isue").returncode == 2


def test_help_names_every_command_and_imports_nothing_heavy() -> None:
    code = (
        "import sys; from lineproof.cli import parser; print(parser().format_help()); "
        "print('MODULES', *sys.modules)"
    )
    done = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True)
    text, _, modules = done.stdout.partition("MODULES")
    assert all(name in text for name in ("issue", "recheck", "lines", "--version"))
    assert not {"json", "sympy", "pint", "lineproof.record", "nbformat"} & set(modules.split())


def test_a_user_s_mistake_shows_no_traceback(tmp_path: Path) -> None:
    done = run("issue", str(tmp_path / "absent.ipynb"))
    assert done.returncode == 2
    assert (
        done.stderr == f"{tmp_path / 'absent.ipynb'}: cannot be read (No such file or directory)\n"
    )


def test_a_terminal_without_the_characters_shows_their_codes(
    beam: Notebook, tmp_path: Path
) -> None:
    record = beam["cells"][-1]["outputs"][0]["data"][MIME]
    record["parts"][0]["entries"][0]["title"] = "width β"
    path = tmp_path / "record.json"
    path.write_text(json.dumps(record))
    done = subprocess.run(
        [sys.executable, "-m", "lineproof", "lines", str(path)],
        capture_output=True, text=True, check=True, env={"PYTHONIOENCODING": "ascii", **_paths()},
    )  # fmt: skip
    assert r"width \u03b2" in done.stdout


def test_stopping_a_run_writes_nothing(
    beam_file: Path, capsys: Capture, monkeypatch: pytest.MonkeyPatch
) -> None:
    def stopped(*_: object) -> None:
        raise KeyboardInterrupt

    monkeypatch.setattr("lineproof.cli.rerun.execute", stopped)
    assert main(["issue", str(beam_file)]) == 130
    assert capsys.readouterr().err.endswith("stopped; nothing has been written\n")
    assert [path.name for path in beam_file.parent.iterdir()] == ["beam.ipynb"]


def _paths() -> dict[str, str]:
    import os  # noqa: PLC0415 - only here

    return {k: v for k, v in os.environ.items() if k in ("PATH", "PYTHONPATH", "HOME")}


# -- progress and files ------------------------------------------------------------------------


class Terminal(io.StringIO):
    def isatty(self) -> bool:
        return True


def test_progress_is_plain_lines_without_a_terminal() -> None:
    stream = io.StringIO()
    progress = Progress(stream)
    progress.step("running beam.ipynb")
    progress.count(1, 2)
    assert stream.getvalue() == "running beam.ipynb\n"


def test_progress_counts_on_a_terminal_and_clears_the_count() -> None:
    stream = Terminal()
    progress = Progress(stream)
    progress.count(1, 2)
    assert stream.getvalue() == "\r  cell 1 of 2"
    progress.count(2, 2)
    progress.step("printing")
    assert stream.getvalue().endswith(f"\r{' ' * 13}\rprinting\n")


def test_files_and_folders_made_for_nothing_are_removed(tmp_path: Path) -> None:
    (tmp_path / "taken").mkdir()
    (tmp_path / "taken" / "mine").write_text("kept")
    files = {tmp_path / "a" / "b" / "new": b"1", tmp_path / "taken": b"2"}
    with pytest.raises(UserError, match="taken: cannot be written"):
        write_all(files)
    assert [path.name for path in tmp_path.iterdir()] == ["taken"]
    assert (tmp_path / "taken" / "mine").read_text() == "kept"


def test_a_replaced_file_keeps_its_permissions(tmp_path: Path) -> None:
    path = tmp_path / "beam.ipynb"
    path.write_text("old")
    path.chmod(0o640)
    write_all({path: b"new"})
    assert path.read_bytes() == b"new"
    assert path.stat().st_mode & 0o777 == 0o640
    assert [p.name for p in tmp_path.iterdir()] == ["beam.ipynb"]


def test_superseded_files_come_back_when_writing_fails(tmp_path: Path) -> None:
    old, gone, missing = tmp_path / "a.pdf", tmp_path / "a-c.dxf", tmp_path / "a-d.dxf"
    old.write_bytes(b"old")
    gone.write_bytes(b"drawing")
    with pytest.raises(UserError, match="nothing has been changed"):
        write_all({old: b"new"}, [gone, missing])
    assert {p.name: p.read_bytes() for p in tmp_path.iterdir()} == {
        "a.pdf": b"old",
        "a-c.dxf": b"drawing",
    }
    write_all({old: b"new"}, [gone])
    assert {p.name: p.read_bytes() for p in tmp_path.iterdir()} == {"a.pdf": b"new"}


@pytest.mark.parametrize("kind", ["json", "html", "pdf", "ipynb"])
def test_a_file_without_end_is_not_read_to_its_end(
    kind: str, tmp_path: Path, capsys: Capture
) -> None:
    path = tmp_path / f"endless.{kind}"
    path.symlink_to("/dev/zero")
    assert main(["lines", str(path)]) == 2
    assert capsys.readouterr().err == (
        f"{path}: cannot be read (a pipe or a device; give a saved file)\n"
    )


@pytest.mark.parametrize("kind", ["json", "html", "pdf", "ipynb"])
def test_a_file_larger_than_any_package_is_not_read(
    kind: str, tmp_path: Path, capsys: Capture
) -> None:
    path = tmp_path / f"large.{kind}"
    with path.open("wb") as stream:
        stream.truncate(64_000_001)
    assert main(["lines", str(path)]) == 2
    assert capsys.readouterr().err == f"{path}: larger than 64 MB; not read\n"


def test_undoing_leaves_what_another_issue_has_put_there(tmp_path: Path) -> None:
    class MeanwhileAnother(dict[Path, bytes]):
        def items(self) -> Any:
            for path, content in super().items():
                yield path, content
                (tmp_path / "new" / "other.pdf").write_bytes(b"other")

    (tmp_path / "file").write_bytes(b"")
    files = MeanwhileAnother({tmp_path / "new" / "a.pdf": b"a", tmp_path / "file" / "b": b"b"})
    with pytest.raises(UserError, match="nothing has been changed"):
        write_all(files)
    assert [path.name for path in (tmp_path / "new").iterdir()] == ["other.pdf"]


def test_a_record_changed_by_hand_gives_itself_away(package: Path, capsys: Capture) -> None:
    """One digit of M_r in the page: the lines are printed, and the one that is wrong is named."""
    page = (package / "beam.html").read_text(encoding="utf-8")
    found = json.loads((package / "beam.json").read_text(encoding="utf-8"))
    values = {e["id"]: e["value"] for p in found["parts"] for e in p["entries"] if "value" in e}
    was = json.dumps(values["flexure/M_r"])
    altered = package / "altered.html"
    altered.write_text(page.replace(was, was.replace("456", "465")), encoding="utf-8")

    assert was.startswith("456")
    assert main(["lines", str(altered)]) == 1
    assert "B1: flexure/M_r: value stored 465" in capsys.readouterr().err
    assert main(["lines", str(package / "beam.html")]) == 0
    assert capsys.readouterr().err == ""


@pytest.mark.parametrize("name", ["floor-beam", "edge-beam"])
def test_lines_of_a_beam_that_ships_are_its_own(name: str) -> None:
    """A process of its own: nothing else has registered the procedures of the analysis."""
    calc = Path(__file__).parents[2] / "calcs" / f"{name}.ipynb"
    command = [sys.executable, "-m", "lineproof", "lines", str(calc)]
    made = subprocess.run(command, capture_output=True, text=True, check=False)
    assert made.returncode == 0, made.stderr
    assert "analysis/M_2D" in made.stdout or "analysis/M_1D" in made.stdout


def test_a_full_disk_behind_the_output_is_told(
    beam_file: Path, capsys: Capture, monkeypatch: pytest.MonkeyPatch
) -> None:
    """As by ``lineproof lines beam.ipynb > list.txt``: the system's error names no file there."""

    class Full(io.StringIO):
        def flush(self) -> None:
            raise OSError(errno.ENOSPC, "No space left on device")

    monkeypatch.setattr(sys, "stdout", Full())
    assert main(["lines", str(beam_file)]) == 2
    assert capsys.readouterr().err == (
        "what is printed here: cannot be reached (No space left on device)\n"
    )


def test_a_file_in_the_place_of_a_folder_is_named(tmp_path: Path) -> None:
    (tmp_path / "report").write_text("notes")
    with pytest.raises(UserError, match="a file stands in the place of the folder"):
        write_all({tmp_path / "report" / "audit.pdf": b"new"})
    assert (tmp_path / "report").read_text() == "notes"


# -- words of the command ------------------------------------------------------------------------


@pytest.mark.parametrize(
    ("words", "told"),
    [
        (
            ["issue", "--out", ".", "calc.ipynb"],
            "--out: is no option of lineproof issue; there are --help, --into, --paper, --update",
        ),
        (
            ["issue", "--intoo=.", "calc.ipynb", "--a4"],
            "--intoo=.: is no option of lineproof issue; did you mean --into? there are --help",
        ),
        (["verify", "one.pdf", "two.pdf"], "two.pdf: is one word too many for lineproof verify"),
    ],
)
def test_options_that_are_none_are_answered_with_those_there_are(
    words: list[str], told: str, tmp_path: Path, monkeypatch: pytest.MonkeyPatch, capsys: Capture
) -> None:
    monkeypatch.chdir(tmp_path)
    assert main(words) == 2
    said = capsys.readouterr().err
    assert said.startswith(told)
    assert f"all of them are shown by lineproof {words[0]} --help" in said
