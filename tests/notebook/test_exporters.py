from __future__ import annotations

import json
import subprocess
import sys
from importlib.metadata import entry_points
from pathlib import Path
from typing import Any

import nbconvert.exporters
import nbformat
import pytest

from lineproof.audit.data import Severity
from lineproof.audit.review.data import Raised, Review, Reviewer
from lineproof.errors import UserError
from lineproof.notebook import exporters
from lineproof.package import records_in_html, records_in_pdf
from lineproof.package.read import reviews_in_html

Notebook = dict[str, Any]

# These functions of Jupyter carry no types.
node: Any = nbformat.from_dict
get_exporter: Any = nbconvert.exporters.get_exporter
CalcPackagePdf: Any = exporters.CalcPackagePdf
CalcPackageHtml: Any = exporters.CalcPackageHtml


def record_of(notebook: Notebook) -> Any:
    data = notebook["cells"][-1]["outputs"][0]["data"]
    return data["application/vnd.lineproof.record+json"]


def test_both_are_found_under_their_names() -> None:
    assert get_exporter("calc_package_pdf") is CalcPackagePdf
    assert get_exporter("calc_package_html") is CalcPackageHtml


def test_the_names_are_what_a_server_can_route() -> None:
    # jupyter_server takes \w+ only, and JupyterLab shows the name as its menu text.
    ours = [e.name for e in entry_points(group="nbconvert.exporters") if "lineproof" in e.value]
    assert sorted(ours) == ["calc_package_html", "calc_package_pdf"]


def test_a_notebook_becomes_a_pdf_with_its_record(beam: Notebook) -> None:
    printed, resources = CalcPackagePdf().from_notebook_node(node(beam))
    assert printed.startswith(b"%PDF-")
    assert records_in_pdf(printed) == [record_of(beam)]
    assert resources["output_extension"] == ".pdf"
    assert CalcPackagePdf.output_mimetype == "application/pdf"


def test_a_notebook_becomes_a_page_with_its_record(beam: Notebook) -> None:
    printed, resources = CalcPackageHtml().from_notebook_node(node(beam))
    assert printed.startswith("<!DOCTYPE html>")
    assert records_in_html(printed) == [record_of(beam)]
    assert "A beam for tests." in printed
    assert resources["output_extension"] == ".html"


def test_nothing_is_left_that_makes_the_server_send_an_archive(beam: Notebook) -> None:
    given = {"metadata": {"name": "beam"}, "outputs": {"a.png": b""}, "attachments": {"b": b""}}
    _, resources = CalcPackageHtml().from_notebook_node(node(beam), given)
    assert not {"outputs", "attachments"} & set(resources)


def test_the_same_notebook_gives_the_same_bytes(beam: Notebook) -> None:
    first, second = (CalcPackagePdf().from_notebook_node(node(beam))[0] for _ in range(2))
    assert first == second


@pytest.mark.parametrize("exporter", [CalcPackagePdf, CalcPackageHtml])
def test_a_notebook_that_was_not_run_is_refused(unrun: Notebook, exporter: Any) -> None:
    resources = {"metadata": {"name": "beam"}}
    with pytest.raises(UserError, match="beam: has not been run; run all cells, then save"):
        exporter().from_notebook_node(node(unrun), resources)


def test_an_edited_cell_is_refused(beam: Notebook) -> None:
    beam["cells"][2]["source"] = 'M_f = "400 kN.m"\nA_s = "2500 mm2"'
    with pytest.raises(UserError, match="was changed after it was run; run all cells, then save"):
        CalcPackagePdf().from_notebook_node(node(beam))


def test_listing_exporters_imports_nothing_heavy() -> None:
    code = "import lineproof.notebook.exporters, sys; print(' '.join(sys.modules))"
    done = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True)
    assert not {"sympy", "pint", "typst", "pypdf"} & set(done.stdout.split())


def test_nbconvert_prints_from_the_command_line(beam_file: Path) -> None:
    command = [sys.executable, "-m", "nbconvert", "--to", "calc_package_pdf", beam_file.name]
    subprocess.run(command, cwd=beam_file.parent, check=True, capture_output=True, timeout=120)
    assert beam_file.with_suffix(".pdf").read_bytes().startswith(b"%PDF-")


def test_nbconvert_fails_with_what_to_do(unrun: Notebook, tmp_path: Path) -> None:
    (tmp_path / "beam.ipynb").write_text(json.dumps(unrun), encoding="utf-8")
    command = [sys.executable, "-m", "nbconvert", "--to", "calc_package_html", "beam.ipynb"]
    done = subprocess.run(
        command, cwd=tmp_path, check=False, capture_output=True, text=True, timeout=120
    )
    assert done.returncode == 1
    assert "beam: has not been run; run all cells, then save" in done.stderr
    assert not (tmp_path / "beam.html").exists()


def _with_review(beam_file: Path, calc: str) -> str:
    """Lay a review with one finding beside the notebook, as the review page saves it."""
    at = "2026-12-01T15:05:33Z"
    found = Raised(1, Severity.MINOR, "Say which bars.", "Kei Mori", at, ("data/A_s",))
    review = Review(calc, reviewers=(Reviewer("Kei Mori", "KM"),), findings=(found,))
    text = review.to_text()
    beam_file.with_name("beam.review.json").write_text(text, encoding="utf-8")
    return text


def test_the_review_beside_the_notebook_is_printed(beam_file: Path) -> None:
    text = _with_review(beam_file, "B1")
    printed, _ = CalcPackageHtml().from_filename(str(beam_file))
    assert "Say which bars." in printed
    assert [json.loads(found) for found in reviews_in_html(printed)] == [json.loads(text)]


def test_a_notebook_that_comes_from_no_file_has_no_review(
    beam: Notebook, beam_file: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    _with_review(beam_file, "B1")
    monkeypatch.chdir(beam_file.parent)
    printed, _ = CalcPackageHtml().from_notebook_node(node(beam), {"metadata": {"name": "beam"}})
    assert reviews_in_html(printed) == []


def test_the_review_of_another_calc_is_refused(beam_file: Path) -> None:
    _with_review(beam_file, "B9")
    with pytest.raises(UserError, match="the review is of calc 'B9', not of 'B1'; move it away"):
        CalcPackagePdf().from_filename(str(beam_file))


def test_a_template_in_the_working_folder_changes_nothing(
    beam: Notebook, tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    before, _ = CalcPackageHtml().from_notebook_node(node(beam))
    for name in ("calc_package_html", "templates", "."):
        (tmp_path / name).mkdir(exist_ok=True)
        (tmp_path / name / "package.html.j2").write_text("taken over")
        (tmp_path / name / "index.html.j2").write_text("taken over")
    monkeypatch.chdir(tmp_path)
    assert CalcPackageHtml().from_notebook_node(node(beam))[0] == before
