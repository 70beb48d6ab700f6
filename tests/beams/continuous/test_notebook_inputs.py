"""The notebooks of beams name every input that there is, for the next designer to find."""

from __future__ import annotations

import ast
import inspect
import json
from pathlib import Path

import pytest

from lineproof import beams

from .notebooks import CALCS, inputs_of

NOTEBOOKS = [CALCS / f"{name}.ipynb" for name in ("floor-beam", "edge-beam", "existing-beam")]


@pytest.mark.parametrize("notebook", NOTEBOOKS, ids=lambda path: path.stem)
def test_every_input_is_named_at_the_top_and_handed_on(notebook: Path) -> None:
    cells = json.loads(notebook.read_text(encoding="utf-8"))["cells"]
    (starting,) = (
        "".join(cell["source"]) for cell in cells if "continuous_beam(" in "".join(cell["source"])
    )
    call = next(
        node
        for node in ast.walk(ast.parse(starting))
        if isinstance(node, ast.Call) and ast.unparse(node.func) == "beams.continuous_beam"
    )
    known = [
        name for name in inspect.signature(beams.continuous_beam).parameters if name != "sheet"
    ]
    assert sorted(inputs_of(notebook)) == sorted(known)
    assert {word.arg: ast.unparse(word.value) for word in call.keywords} == {n: n for n in known}
