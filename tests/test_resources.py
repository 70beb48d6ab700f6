"""Templates and calcs are found in a checkout and in an installed package."""

from __future__ import annotations

import os
import subprocess
import sys
import zipfile
from pathlib import Path

import pytest

from lineproof.errors import UserError
from lineproof.resources import folder, read_file

ROOT = Path(__file__).resolve().parents[1]


def test_a_checkout_uses_its_own_folders() -> None:
    """Not the copy that an editable install has made."""
    assert folder("templates") == ROOT / "templates"
    assert folder("calcs") == ROOT / "calcs"


def test_a_wheel_carries_templates_calcs_and_entry_points(tmp_path: Path) -> None:
    """Unpacked anywhere, it finds its templates inside the package and prints a package."""
    command = [sys.executable, "-m", "hatchling", "build", "-t", "wheel", "-d", str(tmp_path)]
    subprocess.run(command, cwd=ROOT, check=True, capture_output=True)
    (wheel,) = tmp_path.glob("*.whl")
    site = tmp_path / "site"
    zipfile.ZipFile(wheel).extractall(site)
    code = (
        "from lineproof.resources import folder\n"
        "from lineproof.notebook.read import read_calc\n"
        "from lineproof.package import build_package, to_pdf\n"
        "calc = read_calc(folder('calcs') / 'floor-beam.ipynb')\n"
        "print(folder('templates'))\n"
        "print(to_pdf(build_package([calc.record], [calc.walk]))[:5].decode())\n"
    )

    made = subprocess.run(
        [sys.executable, "-c", code],
        cwd=tmp_path, check=True, capture_output=True, text=True,
        env={"PYTHONPATH": str(site), "PATH": ""},
    )  # fmt: skip

    assert made.stdout.split() == [str(site / "lineproof" / "templates"), "%PDF-"]
    (entry_points,) = site.glob("*.dist-info/entry_points.txt")
    assert "calc_package_pdf = lineproof.notebook.exporters" in entry_points.read_text()


def test_a_file_is_read_whole_or_refused(tmp_path: Path) -> None:
    """A named pipe that nothing writes into would be waited for without end."""
    file, pipe = tmp_path / "a.csv", tmp_path / "pipe"
    file.write_bytes(b"x" * 2_000_000)
    os.mkfifo(pipe)

    assert read_file(file, 2_000_000) == b"x" * 2_000_000
    for path, said in (
        (tmp_path / "none", "cannot be read (No such file or directory)"),
        (tmp_path, "cannot be read (Is a directory)"),
        (pipe, "cannot be read (a pipe or a device; give a saved file)"),
    ):
        with pytest.raises(UserError) as told:
            read_file(path, 1_000_000)
        assert told.value.faults == (f"{path}: {said}",)
    with pytest.raises(UserError) as told:
        read_file(file, 1_999_999, "keep the claims alone")
    assert told.value.faults == (f"{file}: larger than 1 MB; keep the claims alone",)
