from __future__ import annotations

import asyncio
import json
import os
import signal
import subprocess
import sys
import threading
from pathlib import Path
from types import SimpleNamespace
from typing import Any

import pytest

from lineproof.errors import UserError
from lineproof.notebook.execute import _end, execute

Notebook = dict[str, Any]


def run(notebook: Notebook, folder: Path) -> Notebook:
    made: Notebook = json.loads(execute(notebook, "beam.ipynb", folder))
    return made


def faults_of(notebook: Notebook, folder: Path) -> tuple[str, ...]:
    with pytest.raises(UserError) as caught:
        execute(notebook, "beam.ipynb", folder)
    return caught.value.faults


def with_code(notebook: Notebook, source: str) -> Notebook:
    """Replace the last cell by other code."""
    notebook["cells"][-1]["source"] = source
    return notebook


def test_a_run_stores_the_same_text_each_time(
    beam: Notebook, beam_text: str, tmp_path: Path
) -> None:
    assert execute(beam, "beam.ipynb", tmp_path) == beam_text


def test_counts_are_whole_numbers_and_no_time_is_stored(beam: Notebook, beam_text: str) -> None:
    counts = [c["execution_count"] for c in beam["cells"] if c["cell_type"] == "code"]
    assert counts == [1, 2, 3, 4, 5]
    assert "iopub" not in beam_text
    assert "execution" not in beam["cells"][1]["metadata"]
    assert beam["metadata"]["language_info"] == {
        "file_extension": ".py", "mimetype": "text/x-python", "name": "python",
    }  # fmt: skip


def test_old_timings_go_and_cells_get_ids(unrun: Notebook, tmp_path: Path) -> None:
    del unrun["cells"][1]["id"]
    unrun["cells"][1]["metadata"] = {"execution": {"iopub.execute_input": "2026"}, "editable": True}
    unrun["nbformat_minor"] = 4
    cell = run(unrun, tmp_path)["cells"][1]
    assert cell["id"] == "cell-2"
    assert cell["metadata"] == {"editable": True}


def test_it_runs_this_python_in_the_given_folder(unrun: Notebook, tmp_path: Path) -> None:
    notebook = with_code(unrun, "import os, sys; print(sys.executable); print(os.getcwd())")
    (output,) = run(notebook, tmp_path)["cells"][-1]["outputs"]
    assert "".join(output["text"]).split("\n")[:2] == [sys.executable, os.path.realpath(tmp_path)]


def test_start_up_files_of_the_user_are_not_run(
    unrun: Notebook, tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    startup = tmp_path / "ipython" / "profile_default" / "startup"
    startup.mkdir(parents=True)
    (startup / "00-changed.py").write_text("M_f = '1 kN.m'; changed = True")
    monkeypatch.setenv("IPYTHONDIR", str(tmp_path / "ipython"))
    notebook = with_code(unrun, "print('changed' in globals())")
    assert run(notebook, tmp_path)["cells"][-1]["outputs"][0]["text"] == ["False\n"]


def test_progress_is_told_cell_by_cell(unrun: Notebook, tmp_path: Path) -> None:
    told: list[tuple[int, int]] = []
    execute(unrun, "beam.ipynb", tmp_path, lambda done, total: told.append((done, total)))
    assert told == [(1, 5), (2, 5), (3, 5), (4, 5), (5, 5)]


def test_faults_of_the_inputs_are_named_with_their_cell(unrun: Notebook, tmp_path: Path) -> None:
    unrun["cells"][2]["source"] = 'M_f = "385 kn.m"\nA_s = "2500 mm2"'
    (fault,) = faults_of(unrun, tmp_path)
    assert fault.startswith('beam.ipynb: cell 4 (sheet = Sheet("B1", "Test beam B1")): M_f: ')
    assert "kn.m" in fault


def test_several_faults_stay_apart(unrun: Notebook, tmp_path: Path) -> None:
    code = "from lineproof.errors import UserError\nraise UserError(['h: wrong', 'b: wrong'])"
    faults = faults_of(with_code(unrun, code), tmp_path)
    assert [fault[-8:] for fault in faults] == ["h: wrong", "b: wrong"]


def test_another_exception_is_named_in_one_line(unrun: Notebook, tmp_path: Path) -> None:
    (fault,) = faults_of(with_code(unrun, "1/0"), tmp_path)
    assert fault == "beam.ipynb: cell 7 (1/0): ZeroDivisionError: division by zero"


def test_a_slip_of_the_pen_is_named_by_its_line(unrun: Notebook, tmp_path: Path) -> None:
    """Python adds the name of a file, which a cell has not."""
    (fault,) = faults_of(with_code(unrun, "a = 1\nb = )"), tmp_path)
    assert fault == "beam.ipynb: cell 7 (a = 1): SyntaxError: unmatched ')' (line 2)"


def test_a_deleted_input_is_told_with_what_to_do(unrun: Notebook, tmp_path: Path) -> None:
    unrun["cells"][2]["source"] = 'A_s = "2500 mm2"'
    (fault,) = faults_of(unrun, tmp_path)
    assert fault.startswith('beam.ipynb: cell 4 (sheet = Sheet("B1", "Test beam B1")): NameError: ')
    assert fault.endswith("name 'M_f' is not defined; give it in a cell above this one")


def test_a_python_that_dies_is_named(unrun: Notebook, tmp_path: Path) -> None:
    (fault,) = faults_of(with_code(unrun, "import os; os._exit(3)"), tmp_path)
    assert fault.startswith("beam.ipynb: Python stopped while running it (")


def test_what_is_printed_is_joined_in_one_pass(unrun: Notebook, tmp_path: Path) -> None:
    """Of a line written over, as a progress bar is, the last stays; a long line takes no time."""
    code = (
        "import sys; print('1 %\\r2 %\\r3 %\\r\\nend', flush=True); "
        "print('e', file=sys.stderr, flush=True); print('x' * 3_000_000)"
    )
    first, second = run(with_code(unrun, code), tmp_path)["cells"][-1]["outputs"]
    assert "".join(first["text"]) == "3 %\nend\n" + "x" * 3_000_000 + "\n"
    assert (second["name"], second["text"]) == ("stderr", ["e\n"])


def test_a_kernel_that_outlives_its_client_is_ended() -> None:
    """As after a signal that comes between two steps of the client."""
    with subprocess.Popen([sys.executable, "-c", "while True: pass"]) as process:
        assert process.poll() is None
        _end(SimpleNamespace(provisioner=SimpleNamespace(process=process)))
        assert process.poll() is not None
    _end(SimpleNamespace(provisioner=None))
    _end(None)


def test_a_cell_that_never_ends_is_stopped_by_the_keyboard(unrun: Notebook, tmp_path: Path) -> None:
    timer = threading.Timer(3, os.kill, (os.getpid(), signal.SIGINT))
    timer.start()
    with pytest.raises(KeyboardInterrupt):
        execute(with_code(unrun, "while True: pass"), "beam.ipynb", tmp_path)
    timer.join()


def test_a_signal_while_the_kernel_starts_stops_without_a_traceback(
    beam: Notebook, tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    """SIGTERM cancels the client's wait for its kernel; asyncio says so by what is no Exception."""

    def cancelled(*_: object, **__: object) -> None:
        raise asyncio.CancelledError

    monkeypatch.setattr("nbclient.NotebookClient.execute", cancelled)
    with pytest.raises(KeyboardInterrupt):
        execute(beam, "beam.ipynb", tmp_path)
