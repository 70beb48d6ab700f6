"""The inputs of the calculation notebooks, for the tests of the whole flow."""

from __future__ import annotations

import ast
import json
from pathlib import Path
from typing import Any

CALCS = Path(__file__).parents[3] / "calcs"
EDGE_BEAM, EXISTING_BEAM = CALCS / "edge-beam.ipynb", CALCS / "existing-beam.ipynb"


def inputs_of(notebook: Path) -> dict[str, Any]:
    """Return the inputs that the cell to be edited sets."""
    cells = json.loads(notebook.read_text())["cells"]
    sources = ("".join(cell["source"]) for cell in cells)
    cell = next(text for text in sources if text.startswith("# Edit here"))
    made = {}
    for statement in ast.parse(cell).body:
        assert isinstance(statement, ast.Assign)
        (target,) = statement.targets
        assert isinstance(target, ast.Name)
        made[target.id] = ast.literal_eval(statement.value)
    return made
