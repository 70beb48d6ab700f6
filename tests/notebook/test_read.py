from __future__ import annotations

import json
from collections.abc import Callable
from pathlib import Path
from typing import Any

import pytest

from lineproof.errors import UserError
from lineproof.notebook.display import ANCHOR, METADATA, cell_hash
from lineproof.notebook.read import Calc, calc_of, read_calc
from lineproof.record import MIME

Notebook = dict[str, Any]
GIVENS, FLEXURE, CLOSE = 3, 5, 6  # places of the code cells in the beam's notebook


def read(notebook: Notebook) -> Calc:
    return calc_of(notebook, "beam.ipynb")


def faults_of(notebook: Notebook) -> str:
    with pytest.raises(UserError) as caught:
        read(notebook)
    assert all(fault.startswith("beam.ipynb: ") for fault in caught.value.faults)
    return str(caught.value)


def outputs(notebook: Notebook, place: int) -> list[dict[str, Any]]:
    found: list[dict[str, Any]] = notebook["cells"][place]["outputs"]
    return found


def record_in(notebook: Notebook) -> dict[str, Any]:
    found: dict[str, Any] = outputs(notebook, CLOSE)[0]["data"][MIME]
    return found


def test_prose_and_parts_come_in_the_order_of_the_cells(beam: Notebook) -> None:
    calc = read(beam)
    assert calc.walk == (
        ("prose", "# Beam B1\n\nA beam for tests."),
        ("part", "data"),
        ("prose", "The block is {{ a }} deep, the resistance {{ M_r }}."),
        ("part", "flexure"),
    )
    assert calc.record.calc_id == "B1"
    assert calc.remarks == ()


def test_the_record_holds_the_values_of_the_run(beam: Notebook) -> None:
    # By hand: a = 850000/31695.04 = 26.818 mm; M_r = 850000 x (550 - 13.409) = 456.10e6 N.mm.
    entries = read(beam).record.entries
    assert entries["flexure/a"]["value"] == pytest.approx(26.818, abs=5e-4)
    assert entries["flexure/M_r"]["value"] == pytest.approx(456.10, abs=5e-3)


def test_sources_stored_as_text_or_as_lines_read_alike(beam: Notebook) -> None:
    as_lines = read(beam).walk
    for cell in beam["cells"]:
        cell["source"] = "".join(cell["source"])
    assert read(beam).walk == as_lines


def test_prose_with_the_tag_remove_cell_is_left_out(beam: Notebook) -> None:
    beam["cells"][0]["metadata"]["tags"] = ["remove-cell"]
    assert read(beam).walk[0] == ("part", "data")


def test_an_output_beside_the_record_is_named(beam: Notebook) -> None:
    outputs(beam, GIVENS).append({"output_type": "stream", "name": "stdout", "text": "hello"})
    (remark,) = read(beam).remarks
    assert "cell 4 (sheet = Sheet(" in remark
    assert "not printed" in remark


def test_a_notebook_never_run(unrun: Notebook) -> None:
    assert "has not been run; run all cells, then save" in faults_of(unrun)


def without_parameters(notebook: Notebook) -> None:
    notebook["cells"][2]["metadata"] = {}


def two_parameters(notebook: Notebook) -> None:
    notebook["cells"][1]["metadata"] = {"tags": ["parameters"]}


def without_record(notebook: Notebook) -> None:
    notebook["cells"][CLOSE]["outputs"] = []


def two_records(notebook: Notebook) -> None:
    outputs(notebook, FLEXURE).append(outputs(notebook, CLOSE)[0])


def unknown_anchor(notebook: Notebook) -> None:
    outputs(notebook, FLEXURE)[0]["data"][ANCHOR] = {"part": "shear"}


def doubled_anchor(notebook: Notebook) -> None:
    outputs(notebook, FLEXURE).append(outputs(notebook, FLEXURE)[0])


def missing_anchor(notebook: Notebook) -> None:
    notebook["cells"][FLEXURE]["outputs"] = []


def damaged_anchor(notebook: Notebook) -> None:
    outputs(notebook, FLEXURE)[0]["data"][ANCHOR] = ["flexure"]


def hostile_formula(notebook: Notebook) -> None:
    flexure = record_in(notebook)["parts"][1]["entries"]
    flexure[0]["formula"] = "a = __import__('os').system('touch /tmp/x')"


def failed_cell(notebook: Notebook) -> None:
    outputs(notebook, FLEXURE).append(
        {"output_type": "error", "ename": "UserError", "evalue": "f_c: 'x' is no number"}
    )


def edited_input(notebook: Notebook) -> None:
    notebook["cells"][2]["source"] = 'M_f = "400 kN.m"\nA_s = "2500 mm2"'


def input_tried_and_put_back(notebook: Notebook) -> None:
    """Run the inputs with another value (6), the part (7), then put the old text back."""
    for place in (GIVENS, FLEXURE):
        note = outputs(notebook, place)[0]["metadata"][METADATA]
        note["cells"] += ["a" * 12, "b" * 12]
    notebook["cells"][2]["execution_count"] = 6


def input_run_again(notebook: Notebook) -> None:
    notebook["cells"][2]["execution_count"] = 8


def cell_put_in(notebook: Notebook) -> None:
    extra = {"cell_type": "code", "id": "x", "metadata": {}, "source": "f_y = 1", "outputs": []}
    notebook["cells"].insert(3, extra | {"execution_count": None})


def part_run_again(notebook: Notebook) -> None:
    outputs(notebook, FLEXURE)[0]["metadata"][METADATA]["part"] = "0" * 16


def output_edited(notebook: Notebook) -> None:
    """A number of what is shown, typed over in the file: the record still has the old one."""
    data = outputs(notebook, FLEXURE)[0]["data"]
    text = "".join(data["text/html"])
    assert "2500" in text
    data["text/html"] = text.replace("2500", "2900")


def half_a_character(notebook: Notebook) -> None:
    notebook["cells"][2]["source"] += "\nx = '\ud800'"


def damaged_metadata(notebook: Notebook) -> None:
    outputs(notebook, GIVENS)[0]["metadata"] = [1]


def damaged_attachments(notebook: Notebook) -> None:
    notebook["cells"][0]["attachments"] = {"a.png": [1]}


def run_out_of_order(notebook: Notebook) -> None:
    first, second = outputs(notebook, GIVENS)[0], outputs(notebook, FLEXURE)[0]
    notebook["cells"][GIVENS]["outputs"] = [second]
    notebook["cells"][FLEXURE]["outputs"] = [first]


@pytest.mark.parametrize(
    ("damage", "said"),
    [
        (without_parameters, "no cell with the inputs; tag the code cell that holds them"),
        (two_parameters, "cell 2 (from lineproof import Sheet) and cell 3 (M_f = "),
        (without_record, "holds no record; end it with a cell 'sheet.close()'"),
        (two_records, "holds 2 records"),
        (unknown_anchor, "shows part 'shear', which the record does not hold"),
        (doubled_anchor, "part 'flexure' is shown twice"),
        (missing_anchor, "part 'flexure' of the record is shown by no cell"),
        (damaged_anchor, "shows a damaged part"),
        (hostile_formula, "__import__"),
        (failed_cell, "ended with an error: f_c: 'x' is no number"),
        (edited_input, 'cell 3 (M_f = "400 kN.m") was changed after it was run'),
        (input_tried_and_put_back, 'cell 3 (M_f = "385 kN.m"'),
        (input_run_again, "was run again after what stands below it"),
        (cell_put_in, "cell 4 (f_y = 1) has not been run"),
        (part_run_again, "shows part 'flexure' otherwise than the record holds it"),
        (
            output_edited,
            "shows part 'flexure' otherwise than it was run: its output was changed by",
        ),
        (half_a_character, "cell 3 is damaged"),
        (damaged_metadata, "is damaged; open the notebook in JupyterLab"),
        (damaged_attachments, "cell 1 is damaged"),
        (run_out_of_order, "were not run in the order of the cells"),
    ],
)
def test_what_is_wrong_is_named(
    beam: Notebook, damage: Callable[[Notebook], None], said: str
) -> None:
    damage(beam)
    assert said in faults_of(beam)


def test_all_faults_are_named_at_once(beam: Notebook) -> None:
    edited_input(beam)
    unknown_anchor(beam)
    said = faults_of(beam)
    assert "was changed after it was run" in said
    assert "shows part 'shear'" in said
    assert "part 'flexure' of the record is shown by no cell" in said


def test_a_part_run_again_without_change_is_not_stale(beam: Notebook) -> None:
    beam["cells"][GIVENS]["execution_count"] = 6
    source = "".join(beam["cells"][GIVENS]["source"])
    outputs(beam, GIVENS)[0]["metadata"][METADATA]["cells"] += ["c" * 12, cell_hash(source)]
    assert read(beam).record.calc_id == "B1"


def test_an_output_stored_in_lines_is_the_same_output(beam: Notebook) -> None:
    """JupyterLab stores texts line by line; older notebooks hold no hash of what is shown."""
    data = outputs(beam, FLEXURE)[0]["data"]
    data["text/html"] = "".join(data["text/html"]).splitlines(keepends=True)
    assert read(beam).record.calc_id == "B1"
    output_edited(beam)
    del outputs(beam, FLEXURE)[0]["metadata"][METADATA]["shown"]
    assert read(beam).record.calc_id == "B1"


def test_outputs_without_metadata_are_taken_as_they_are(beam: Notebook) -> None:
    for place in (GIVENS, FLEXURE):
        outputs(beam, place)[0]["metadata"] = {}
    edited_input(beam)
    assert read(beam).record.calc_id == "B1"


@pytest.mark.parametrize(
    ("content", "said"),
    [
        (b"", "not a notebook"),
        (b"# a text", "not a notebook"),
        (b"\xff\xfe\x00", "not a notebook"),
        (b"[" * 100_000, "not a notebook"),
        (b"[1, 2]", "not a notebook"),
        (b'{"cells": 3, "nbformat": 4}', "not a notebook"),
        (b'{"nbformat": 4}', "is not read"),
        (b'{"worksheets": [], "nbformat": 3}', "notebook format 3 is not read"),
        (b'{"cells": [7], "nbformat": 4}', "cell 1 is damaged"),
        (b'{"cells": [{"cell_type": "code"}], "nbformat": 4}', "cell 1 is damaged"),
        (b'{"cells": [], "metadata": [1], "nbformat": 4}', "metadata are damaged"),
        (b'{"cells": [], "metadata": {"a": "\\ud800"}, "nbformat": 4}', "metadata are damaged"),
    ],
)
def test_what_is_no_notebook_is_refused(tmp_path: Path, content: bytes, said: str) -> None:
    path = tmp_path / "notes.ipynb"
    path.write_bytes(content)
    with pytest.raises(UserError, match=said):
        read_calc(path)


def test_a_missing_file_is_named(tmp_path: Path) -> None:
    with pytest.raises(UserError, match=r"absent\.ipynb: cannot be read \(No such file"):
        read_calc(tmp_path / "absent.ipynb")


def test_a_stored_notebook_is_read_from_its_file(beam_file: Path, beam: Notebook) -> None:
    assert read_calc(beam_file).record.data == read(beam).record.data
    assert json.loads(beam_file.read_text(encoding="utf-8")) == beam


def test_a_record_without_a_line_is_refused(beam: Notebook) -> None:
    record_in(beam)["parts"] = []
    beam["cells"][GIVENS]["outputs"] = beam["cells"][FLEXURE]["outputs"] = []
    assert "its record holds no line; record something before sheet.close()" in faults_of(beam)
